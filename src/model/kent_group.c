#include "kent_joining.h"

#include <math.h>
#include <string.h>

#include "kent_said.h"

/* Closer together than this, fittings on joints that hold are one: outside diameters.
 */
static const double CLOSE = 5.0;

static const kent_fitting_note *note_on(const kent_joining *j, int fitting)
{
    const int point = j->m->fittings[fitting].point;
    const int note = point >= 0 ? j->l->note[point] : -1;
    return note >= 0 ? &j->m->notes[note] : NULL;
}

/* Types that become part of a group unasked. */
static bool may_join(const kent_joining *j, int fitting)
{
    const kent_fitting *f = &j->m->fittings[fitting];
    const kent_fitting_note *note = note_on(j, fitting);

    if (f->point < 0 || f->within_deflection || (note && note->apart)) return false;
    if (kent_role_on_run(f->role)) return false; /* held, or slipping, by itself */
    switch (f->type) {
    case KENT_BEND:
    case KENT_TEE:
    case KENT_WYE:
    case KENT_CROSS:
    case KENT_REDUCER:
    case KENT_DEAD_END:
        return true;
    case KENT_VALVE:
    case KENT_STRAIGHT:
    case KENT_CURVE:
    case KENT_GROUP:
        return false;
    }
    return false;
}

/* Whether its legs lie as in space, so that they can be added to another fitting's. */
static bool lies_in_plan(const kent_model *m, const kent_fitting *f)
{
    if (isnan(f->at.x + f->at.y)) return false;
    for (size_t k = 0; k < f->port_count; k++) {
        const int toward = m->ports[f->port_first + k].toward;
        if (toward >= 0 && isnan(m->points[toward].at.x + m->points[toward].at.y)) {
            return false;
        }
    }
    return true;
}

static bool is_blocked(const kent_fitting *f)
{
    return f->restraint == KENT_THRUST_BLOCK || f->restraint == KENT_ANCHOR_BLOCK;
}

/* ---- unasked --------------------------------------------------------------------- */

static void meet(kent_joining *j, int fitting, size_t port, const kent_way *way)
{
    kent_model *m = j->m;
    const kent_fitting *a = &m->fittings[fitting], *b = &m->fittings[way->fitting];
    const kent_said gap = kent_said_of(KENT_LENGTH, m->units, way->distance);

    if (!way->slips && lies_in_plan(m, a) && lies_in_plan(m, b)) {
        kent_joining_unite(j, fitting, way->fitting);
        kent_joining_inner(j, fitting, port, way);
    } else if (!way->slips) {
        kent_notes_add(
            &m->cautions,
            "\"%s\" and \"%s\" stand %s apart on joints that hold and push as "
            "one, but without x and y how they lie is not known: give x and "
            "y, or stations and turns; here each is held by itself",
            a->id, b->id, gap.s);
    } else if (is_blocked(a) || is_blocked(b)) {
        kent_notes_add(&m->cautions,
                       "\"%s\" and \"%s\" stand %s apart, less than five outside "
                       "diameters, with joints between that slip: their blocks may "
                       "meet. Hold both with one (together_with), join them by "
                       "restrained joints, or write apart = true",
                       a->id, b->id, gap.s);
    }
}

static void group_unasked(kent_joining *j)
{
    const kent_model *m = j->m;
    for (size_t f = 0; f < m->fitting_count; f++) {
        const kent_fitting *fitting = &m->fittings[f];
        if (!may_join(j, (int)f)) continue;
        for (size_t k = 0; k < fitting->port_count; k++) {
            const size_t port = fitting->port_first + k;
            kent_way way;
            if (!kent_joining_way(j, (int)f, port, CLOSE, (double)INFINITY, &way)) {
                continue;
            }
            if (way.fitting <= (int)f || !may_join(j, way.fitting)) continue;
            meet(j, (int)f, port, &way);
        }
    }
}

/* ---- asked for ------------------------------------------------------------------- */

/* The fitting at a point, if it may be held together with others; else -1 with a
 * complaint. */
static int asked(const kent_joining *j, const kent_fitting_note *note, int point,
                 kent_complaints *complaints)
{
    const kent_model *m = j->m;
    const int f = j->fitting_at[point];
    const char *id = m->points[point].id;
    const char *wrong = NULL;

    if (f < 0) {
        wrong = "no fitting stands there; name points where one does";
    } else if (m->fittings[f].type == KENT_VALVE) {
        wrong = "a valve is held by itself, since it is pushed from either side when "
                "shut; leave it out";
    } else if (m->fittings[f].type == KENT_CURVE) {
        wrong =
            "the pipe follows a curve there, which the soil holds along its length; "
            "leave it out";
    } else if (!lies_in_plan(m, &m->fittings[f])) {
        wrong = "without x and y how fittings lie to each other is not known; give x "
                "and y, or stations and turns";
    }
    if (!wrong) return f;
    kent_place_complain(m, note->place, complaints,
                        "fitting at \"%s\": together_with \"%s\": %s",
                        m->points[note->point].id, id, wrong);
    return -1;
}

/* Legs between the members of one group; says where a joint between them slips. */
static void close_between(kent_joining *j, int fitting, bool *apart)
{
    const kent_model *m = j->m;
    const kent_fitting *f = &m->fittings[fitting];
    for (size_t k = f->port_first; k < f->port_first + f->port_count; k++) {
        kent_way way;
        if (!kent_joining_way(j, fitting, k, (double)INFINITY, (double)INFINITY,
                              &way)) {
            continue;
        }
        if (way.fitting == fitting) continue;
        const int root = kent_joining_root(j, fitting);
        if (kent_joining_root(j, way.fitting) != root) continue;
        kent_joining_inner(j, fitting, k, &way);
        *apart |= way.slips;
    }
}

static void group_asked(kent_joining *j, const kent_fitting_note *note,
                        kent_complaints *complaints)
{
    const kent_model *m = j->m;
    const int first = asked(j, note, note->point, complaints);
    bool sound = first >= 0;
    for (size_t i = 0; i < note->together_count; i++) {
        const int point = m->together[note->together_first + i];
        const int other = asked(j, note, point, complaints);
        sound &= other >= 0;
        if (sound) kent_joining_unite(j, first, other);
    }
    if (!sound) return;
    bool slips = false;
    close_between(j, first, &slips);
    for (size_t i = 0; i < note->together_count; i++) {
        const int point = m->together[note->together_first + i];
        close_between(j, j->fitting_at[point], &slips);
    }
    if (!slips) return;
    kent_notes_add(
        &j->m->cautions,
        "\"%s\" is held as one with others, though joints between them slip: "
        "one block has to hold them all",
        m->points[note->point].id);
}

/* ---- what they make together ----------------------------------------------------- */

static double least(double a, double b) { return isnan(a) || b < a ? b : a; }

/* Whether a soil holds nothing, or none is stated. */
static bool holds_nothing(const kent_model *m, int soil)
{
    if (soil < 0) return true;
    const kent_soil *s = &m->soils[soil];
    return s->unreliable || s->allowable_bearing <= 0.0; /* NaN: another route */
}

/* The first member's soil is a group's, unless another lies in ground that holds
 * nothing. */
static void take_soil(const kent_joining *j, const kent_fitting *member,
                      kent_fitting *group)
{
    const kent_model *m = j->m;
    if (member->soil == group->soil) return;
    if (holds_nothing(m, member->soil)) group->soil = member->soil;
    kent_notes_add(&j->m->cautions,
                   "the fittings held as one at \"%s\" lie in different soils: %s is "
                   "used",
                   group->id,
                   group->soil >= 0 ? m->soils[group->soil].id
                                    : "none, as stated for one");
}

/* Whether something is stated that only a fitting by itself can have. */
static bool states_own(const kent_stated *s)
{
    return s->closes_stated || !isnan(s->run_length[0]) || !isnan(s->run_length[1]);
}

/* The steeper slope and the weaker backing count; what goes by legs is lost. */
static void take_stated(const kent_joining *j, const kent_fitting *member,
                        kent_stated *stated)
{
    const kent_stated *s = &member->stated;
    if (!isnan(s->slope.angle) && !(s->slope.angle <= stated->slope.angle)) {
        stated->slope = s->slope;
    }
    if (s->backing == KENT_BACKING_FILL) stated->backing = s->backing;
    if (isnan(stated->block_share)) stated->block_share = s->block_share;
    if (isnan(stated->contact_area)) stated->contact_area = s->contact_area;
    if (stated->reason[0] == '\0') memcpy(stated->reason, s->reason, sizeof s->reason);
    if (!states_own(s)) return;
    kent_notes_add(&j->m->cautions,
                   "run_restrained and can_close of \"%s\" are not looked at, since it "
                   "is held as one with others: write apart = true there",
                   member->id);
}

/* What of a member's own a group cannot carry is said. */
static void caution_lost(const kent_joining *j, const kent_fitting *group,
                         const kent_fitting *member)
{
    kent_notes *cautions = &j->m->cautions;
    if (member->obstacle_count > 0 && group->obstacle_first != member->obstacle_first) {
        kent_notes_add(cautions,
                       "obstacles near \"%s\" are not looked at, since it is held as "
                       "one with \"%s\": state them there",
                       member->id, group->id);
    }
    if (member->branch.end != KENT_BRANCH_NONE &&
        group->branch.end != KENT_BRANCH_NONE) {
        kent_notes_add(cautions,
                       "the branch at \"%s\" is not looked at as extended, since it is "
                       "held as one with \"%s\", which has one of its own",
                       member->id, group->id);
    }
}

static void take_in(const kent_joining *j, const kent_fitting *member, size_t number,
                    kent_fitting *group)
{
    const double share = 1.0 / (double)(number + 1); /* running mean */
    group->at = kent_vec3_add(
        group->at, kent_vec3_scale(share, kent_vec3_sub(member->at, group->at)));
    if (number == 0) group->stated = kent_stated_blank();
    take_stated(j, member, &group->stated);
    if (number == 0) return;
    take_soil(j, member, group);
    caution_lost(j, group, member);
    group->weight += member->weight;
    group->cover = least(group->cover, member->cover);
    group->water_table = least(group->water_table, member->water_table);
    if (group->role == KENT_ROLE_NONE) group->role = member->role;
    if (group->branch.end == KENT_BRANCH_NONE) group->branch = member->branch;
    if (group->obstacle_count == 0) {
        group->obstacle_first = member->obstacle_first;
        group->obstacle_count = member->obstacle_count;
    }
}

/* What a note asks for; else restrained joints or anchors where all would have them,
 * and a thrust block for the rest. False with a complaint where notes differ. */
static bool settle_restraint(const kent_joining *j, int root, kent_fitting *group,
                             kent_complaints *complaints)
{
    const kent_model *m = j->m;
    int said = -1;
    bool alike = true;
    for (int f = root; f >= 0; f = j->next[f]) {
        const kent_fitting_note *note = note_on(j, f);
        alike &= m->fittings[f].restraint == m->fittings[root].restraint;
        if (!note || note->restraint < 0) continue;
        if (said >= 0 && said != note->restraint) {
            kent_place_complain(
                m, note->place, complaints,
                "fitting at \"%s\": it is held as one with \"%s\", which "
                "asks for another restraint; state one for both, or "
                "write apart = true",
                m->points[note->point].id, group->id);
            return false;
        }
        said = note->restraint;
    }
    group->restraint = said >= 0 ? (kent_restraint_choice)said
                       : alike   ? m->fittings[root].restraint
                                 : KENT_THRUST_BLOCK;
    return true;
}

/* Whether some member is not joined to the others by pipe within the group. */
static bool is_parted(const kent_joining *j, int root)
{
    for (int f = j->next[root]; f >= 0; f = j->next[f]) {
        if (kent_joining_link(j, f) != kent_joining_link(j, root)) return true;
    }
    return false;
}

static size_t outlets_of(const kent_port *ports, size_t count)
{
    size_t outlets = 0;
    for (size_t k = 0; k < count; k++) {
        outlets += ports[k].kind == KENT_PORT_OUTLET;
    }
    return outlets;
}

static bool merge(const kent_joining *j, int root, kent_fitting *out, kent_port *ports,
                  kent_complaints *complaints)
{
    const kent_model *m = j->m;
    size_t count = 0, number = 0;

    *out = m->fittings[root];
    for (int f = root; f >= 0; f = j->next[f]) {
        const kent_fitting *member = &m->fittings[f];
        take_in(j, member, number++, out);
        for (size_t k = 0; k < member->port_count; k++) {
            if (j->inner[member->port_first + k]) continue;
            if (count < KENT_ARMS) {
                ports[count] = m->ports[member->port_first + k];
                ports[count].level = member->at.z;
            }
            count++;
        }
    }
    if (count == 0 || count > KENT_ARMS) {
        kent_place_complain(
            m, out->place, complaints,
            "fitting at \"%s\": %zu legs lead out of the %zu fittings "
            "held as one with it; one to %d can be worked out, so write "
            "apart = true at some, or together_with at fewer",
            out->id, count, number, KENT_ARMS);
        return false;
    }
    if (outlets_of(ports, count) > 1) {
        kent_place_complain(
            m, out->place, complaints,
            "fitting at \"%s\": two open branches among those held as one with it, and "
            "what each of them draws would not be known; end one with \"valve\" or "
            "\"blank\", or write apart = true there",
            out->id);
        return false;
    }
    const kent_port *largest = &ports[kent_ports_largest(ports, count)];
    out->type = KENT_GROUP;
    out->port_count = count;
    out->angle = out->plan_turn = 0.0;
    out->size = largest->inside_diameter;
    out->outside_diameter = largest->outside_diameter;
    out->branch_size = (double)NAN;
    out->within_deflection = false;
    out->parted = is_parted(j, root);
    out->orientation = kent_ports_push(ports, count);
    return settle_restraint(j, root, out, complaints);
}

kent_status kent_group_fittings(kent_model *m, const kent_layout *l,
                                kent_complaints *complaints)
{
    kent_joining j = {0};
    kent_status status = kent_joining_start(&j, m, l);

    if (status != KENT_OK) goto done;
    group_unasked(&j);
    for (size_t i = 0; i < m->note_count; i++) {
        const kent_fitting_note *note = &m->notes[i];
        if (note->together_count == 0 || note->point < 0) continue;
        if (l->note[note->point] != (int)i) continue; /* complained of */
        group_asked(&j, note, complaints);
    }
    status = kent_joining_finish(&j, merge, complaints);
done:
    kent_joining_clear(&j);
    return status;
}
