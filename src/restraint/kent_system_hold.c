/* What legs out of a system must hold together, and what is said of it. */
#include "kent_block_internal.h"
#include "kent_said.h"
#include "kent_system_internal.h"

#include <stdio.h>

static const double PI = 3.14159265358979323846;

/* Relative: demands that differ by less are one. */
static const double SAME = 1e-9;

/* rad either side of a right angle within which ground beyond a turn is said to pull
 * across. Common practice, no source. */
static const double NEAR_RIGHT = 15.0 * 3.14159265358979323846 / 180.0;

/* ---- one system ------------------------------------------------------------------ */

static kent_leg *own_leg(const kent_system_work *w, const kent_system_leg *leg)
{
    return &w->r->fittings[leg->fitting].legs[leg->leg];
}

static const kent_port *port_of(const kent_system_work *w, const kent_system_leg *leg)
{
    const kent_fitting *f = &w->m->fittings[leg->fitting];
    return &w->m->ports[f->port_first + own_leg(w, leg)->port];
}

static bool leads_out(const kent_system_leg *leg)
{
    return leg->leg != SIZE_MAX && leg->toward == SIZE_MAX;
}

static bool is_bend(const kent_system_work *w, const kent_system_leg *leg)
{
    return leg->leg != SIZE_MAX && w->m->fittings[leg->fitting].type == KENT_BEND;
}

/* A leg of what a single leg holds: a dead end, or a branch. */
static bool is_end(const kent_system_work *w, const kent_system_leg *leg)
{
    const kent_fitting *f = &w->m->fittings[leg->fitting];
    return leg->leg != SIZE_MAX && f->type != KENT_BEND &&
           w->r->fittings[leg->fitting].leg_count == 1;
}

/* N that the ground gives over the first `length` (m) of a leg; NAN: not known. */
static double gives_along(const kent_system_work *w, const kent_system_leg *leg,
                          double length)
{
    const kent_fitting *f = &w->m->fittings[leg->fitting];
    return kent_leg_gives(w->m, f, own_leg(w, leg), length);
}

/* ---- what a leg out of it must hold ---------------------------------------------- */

/* What a leg out of a system is asked by all of it together. */
typedef struct system_ask {
    double force, factor; /* N, - */
    double angle;         /* rad, of the whole turn; 0: an end's */
    double inner;         /* N, that the leg towards the next fitting takes off */
    double demand;        /* N */
    bool bears;
} system_ask;

/* The legs of a system by what they are. */
typedef struct system_view {
    const kent_system_leg *legs;
    size_t count;
    const kent_system_leg *out[2]; /* the first two that lead out */
    size_t outs, bends, ends, others;
    const kent_system_leg *end;
} system_view;

static system_view view_of(const kent_system_work *w, const kent_system_leg *legs,
                           size_t count)
{
    system_view v = {.legs = legs, .count = count};

    for (size_t i = 0; i < count; i++) {
        if (leads_out(&legs[i])) {
            if (v.outs < 2) v.out[v.outs] = &legs[i];
            v.outs++;
        }
        if (is_bend(w, &legs[i])) {
            v.bends++;
        } else if (is_end(w, &legs[i])) {
            v.end = &legs[i];
            v.ends++;
        } else {
            v.others++;
        }
    }
    return v;
}

/* rad between the ways out, 0 where they lead apart on one line; without coordinates as
 * if all bends turned the same way. */
static double whole_turn(const kent_system_work *w, const system_view *v)
{
    const double cosine = -kent_vec3_dot(port_of(w, v->out[0])->direction,
                                         port_of(w, v->out[1])->direction);
    double sum = 0.0;

    if (!isnan(cosine)) return acos(fmax(-1.0, fmin(1.0, cosine)));
    for (size_t i = 0; i < v->count; i++) {
        sum += 0.5 * w->m->fittings[v->legs[i].fitting].angle; /* each has two legs */
    }
    return fmin(PI, sum);
}

/* Whether together they push up, by more than is neglected. */
static bool pushes_up(const kent_system_work *w, const system_view *v)
{
    const kent_vec3 sum = kent_vec3_add(port_of(w, v->out[0])->direction,
                                        port_of(w, v->out[1])->direction);
    return !(-sum.z <= KENT_BLOCK_NEGLIGIBLE * kent_vec3_length(sum) + SAME);
}

/* The inner leg of the same fitting; NULL. */
static const kent_system_leg *inner_of(const system_view *v, const kent_system_leg *out)
{
    for (size_t i = 0; i < v->count; i++) {
        const kent_system_leg *leg = &v->legs[i];
        if (leg->fitting == out->fitting && leg->leg != SIZE_MAX && leg != out &&
            leg->toward != SIZE_MAX) {
            return leg;
        }
    }
    return NULL;
}

/* Bends alone, between two ways out: as one bend of the whole turn, less what the pipe
 * towards the next one holds up to half way. source 22.2 */
static bool ask_of_turn(const kent_system_work *w, const system_view *v,
                        const kent_system_leg *out, system_ask *ask)
{
    const kent_leg *own = own_leg(w, out);
    const kent_system_leg *inner = inner_of(v, out);

    *ask = (system_ask){.factor = own->factor, .bears = !pushes_up(w, v)};
    for (size_t i = 0; i < v->count; i++) {
        const kent_leg *leg = own_leg(w, &v->legs[i]);
        ask->force = fmax(ask->force, leg->factor * leg->pull / ask->factor);
        ask->bears = ask->bears && leg->bears;
    }
    ask->angle = whole_turn(w, v);
    if (inner) {
        const double along = fmax(0.0, cos(w->m->fittings[out->fitting].angle));
        const double length = fmin(own_leg(w, inner)->length, 0.5 * inner->away);
        const double gives = gives_along(w, inner, length);
        ask->inner = isnan(gives) ? 0.0 : fmax(0.0, along * gives);
    }
    const bool back = ask->angle > 0.5 * PI;
    ask->bears = ask->bears && !back;
    const double whole =
        ask->factor * ask->force * (back ? 1.0 : tan(0.5 * ask->angle));
    ask->demand = whole - ask->inner;
    return ask->demand > own->demand * (1.0 + SAME);
}

/* An end, and bends on its only way out: the last leg is drawn by all that the end
 * pushes with, less what its own leg holds up to the first bend. source 22.3 */
static bool ask_of_end(const kent_system_work *w, const system_view *v,
                       const kent_system_leg *out, system_ask *ask)
{
    const kent_leg *own = own_leg(w, out), *end = own_leg(w, v->end);
    const double cosine =
        kent_vec3_dot(port_of(w, v->end)->direction, port_of(w, out)->direction);
    const double gives = gives_along(w, v->end, fmin(end->length, v->end->away));

    *ask = (system_ask){.factor = end->factor, .force = end->pull};
    if (!isnan(cosine) && !isnan(gives)) ask->inner = fmax(0.0, cosine * gives);
    ask->demand = end->demand - ask->inner;
    return ask->demand > own->demand * (1.0 + SAME);
}

static void derive_ask(const kent_system_work *w, const kent_system_leg *out,
                       const system_ask *ask, const kent_leg_work *work)
{
    kent_derivation *d = &w->r->fittings[out->fitting].derivation;
    const kent_port *p = port_of(w, out);
    const bool turn = ask->angle > 0.0;
    char says[120];

    (void)snprintf(says, sizeof says, "As one system: the leg%s%s leads out of it",
                   p->toward >= 0 ? " towards " : "",
                   p->toward >= 0 ? w->m->points[p->toward].id : "");
    kent_derivation_heading(d, says);
    kent_derivation_put(d, "SF", ask->factor, KENT_RATIO, KENT_COMPUTED, "factor");
    kent_derivation_put(d, "S", ask->force, KENT_FORCE, KENT_COMPUTED,
                        turn ? "largest pull of its bends"
                             : "what its end pushes with");
    kent_derivation_put(d, "Ci", ask->inner, KENT_FORCE, KENT_COMPUTED,
                        "held by the pipe inside the system, along this leg");
    if (turn) {
        const bool back = ask->angle > 0.5 * PI;
        kent_derivation_put(d, "thetas", ask->angle, KENT_ANGLE, KENT_COMPUTED,
                            "turn of the whole system");
        kent_derivation_work(d, "Ds", ask->demand, KENT_FORCE,
                             back ? "SF*S - Ci" : "SF*S*tan(thetas/2) - Ci", "22.2",
                             "what this leg must hold");
    } else if (ask->demand > 0.0) {
        kent_derivation_put(d, "Ds", ask->demand, KENT_FORCE, KENT_COMPUTED,
                            "what this leg must hold: the end's demand less Ci (22.3)");
    }
    kent_derivation_put(d, "L", work->length, KENT_LENGTH, KENT_COMPUTED,
                        "restrained length of it, part by part (11.17)");
}

/* Gives the leg what the system asks. Returns whether it got longer. */
static bool lengthen(const kent_system_work *w, const kent_system_leg *out,
                     const system_ask *ask)
{
    const kent_fitting *f = &w->m->fittings[out->fitting];
    const kent_port *p = port_of(w, out);
    kent_leg *own = own_leg(w, out);
    kent_leg_work work = {
        .pipe = &w->m->pipes[w->m->spans[p->span].pipe],
        .bend = true,
        .bears = ask->bears,
        .turns_back = ask->angle > 0.5 * PI,
        .force = ask->force,
        .angle = ask->angle,
        .factor = ask->factor,
        .demand = ask->demand,
        .limit = INFINITY,
        .form = ask->bears ? w->m->rules.length_form : KENT_FORM_HANDBOOK,
        .by_form = {NAN, NAN},
    };

    if (kent_leg_measure(w->m, f, p, &work) != 0) {
        own->fits = false; /* no ground along it holds that */
        own->lengthened = true;
        return false;
    }
    if (!(work.length > own->length * (1.0 + SAME))) return false;
    derive_ask(w, out, ask, &work);
    (void)kent_leg_lay(w->m, w->standings, out->fitting, own->port, &work, own);
    own->lengthened = true;
    return true;
}

/* Bends alone between two ways out. */
static bool is_turn(const system_view *v)
{
    return v->outs == 2 && v->ends == 0 && v->others == 0 &&
           v->out[0]->fitting != v->out[1]->fitting;
}

/* An end behind bends, with one way out. */
static bool is_ended(const system_view *v)
{
    return v->outs == 1 && v->ends == 1 && v->others == 0 && v->bends > 0 &&
           v->end != v->out[0];
}

bool kent_system_lengthen(kent_system_work *w)
{
    bool longer = false;

    for (size_t i = 0; i < w->leg_count;) {
        const size_t count = kent_system_legs(w, i);
        const system_view v = view_of(w, &w->legs[i], count);
        const bool turn = is_turn(&v), end = is_ended(&v);
        for (size_t k = 0; k < v.outs && k < 2; k++) {
            system_ask ask;
            if (turn ? ask_of_turn(w, &v, v.out[k], &ask)
                     : end && ask_of_end(w, &v, v.out[k], &ask)) {
                longer = lengthen(w, v.out[k], &ask) || longer;
            }
        }
        i += count;
    }
    return longer;
}

/* ---- what it comes to ------------------------------------------------------------ */

static void tell_outers(const kent_system_work *w, kent_system_of *system,
                        const kent_system_leg *legs, size_t count)
{
    kent_systems *s = &w->r->systems;

    system->outer_first = s->outer_count;
    system->needed = system->given = 0.0;
    system->fits = true;
    for (size_t i = 0; i < count; i++) {
        if (legs[i].leg == SIZE_MAX) continue;
        const kent_leg *own = own_leg(w, &legs[i]);
        system->fits = system->fits && own->fits;
        system->lengthened = system->lengthened || own->lengthened;
        if (!leads_out(&legs[i])) continue;
        s->outers[s->outer_count++] =
            (kent_outer){.fitting = legs[i].fitting,
                         .port = own->port,
                         .length = own->length,
                         .needed = own->demand,
                         .given = gives_along(w, &legs[i], own->reach),
                         .fits = own->fits};
        system->outer_count++;
        system->needed += own->demand;
        system->given += s->outers[s->outer_count - 1].given;
    }
}

/* Whether a crest and a sag of the system stand next to each other. */
static bool has_offset(const kent_system_work *w, const kent_system_leg *legs,
                       size_t count)
{
    for (size_t i = 0; i < count; i++) {
        if (legs[i].toward == SIZE_MAX) continue;
        const kent_fitting *a = &w->m->fittings[legs[i].fitting];
        const kent_fitting *b = &w->m->fittings[legs[i].toward];
        if (a->type != KENT_BEND || b->type != KENT_BEND) continue;
        if (a->orientation == KENT_CREST && b->orientation == KENT_SAG) return true;
    }
    return false;
}

/* Lengths that run on past a turn of nearly a right angle. */
static bool tell_across(const kent_system_work *w, const kent_system_leg *legs,
                        size_t count)
{
    bool across = false;

    for (size_t i = 0; i < count; i++) {
        for (size_t k = 0; k < legs[i].walk.passed_count; k++) {
            const kent_fitting *f = &w->m->fittings[legs[i].walk.passed[k]];
            const double off = fabs(f->angle - 0.5 * PI);
            if (f->type != KENT_BEND || off > NEAR_RIGHT) continue;
            across = true;
            kent_notes_warn(
                &w->r->fittings[legs[i].fitting].cautions,
                "the restrained length runs on past %s, which turns %s: "
                "what lies beyond is pulled across, so that %s must be held "
                "by what holds it alone; lay them further apart if that can "
                "be",
                f->id, kent_said_of(KENT_ANGLE, w->m->units, f->angle).s, f->id);
        }
    }
    return across;
}

/* "B1, B2 and B3" */
static void names_of(const kent_system_work *w, const kent_system_of *system,
                     kent_text *t)
{
    for (size_t i = 0; i < system->fitting_count; i++) {
        const size_t f = w->r->systems.fittings[system->fitting_first + i];
        const char *sep = i == 0 ? "" : i + 1 < system->fitting_count ? ", " : " and ";
        kent_text_add(t, "%s%s", sep, w->m->fittings[f].id);
    }
}

/* "P from 1+020 to 1+054" */
static void stretches_of(const kent_system_work *w, const kent_system_of *system,
                         kent_text *t)
{
    for (size_t i = 0; i < system->stretch_count; i++) {
        const kent_stretch *s = &w->r->systems.stretches[system->stretch_first + i];
        kent_text_add(t, "%s%s from %s to %s", i > 0 ? ", " : "",
                      w->m->pipes[s->pipe].id,
                      kent_said_station(w->m->units, s->station_from).s,
                      kent_said_station(w->m->units, s->station_to).s);
    }
}

/* Said once, at the first of its fittings. */
static bool tell_system(const kent_system_work *w, const kent_system_of *system,
                        const system_view *v)
{
    const size_t first = w->r->systems.fittings[system->fitting_first];
    kent_notes *notes = &w->r->fittings[first].cautions;
    kent_text names = {0}, where = {0};
    char joints[40] = "";

    if (system->fitting_count < 2) return true;
    names_of(w, system, &names);
    stretches_of(w, system, &where);
    if (system->joints > 0) {
        (void)snprintf(joints, sizeof joints, ", %d joints", system->joints);
    }
    kent_notes_add(notes,
                   "restrained lengths of %s meet and are one system%s: restrain every "
                   "joint, %s%s (%s)",
                   kent_text_of(&names), system->offset ? ", a vertical offset" : "",
                   kent_said_of(KENT_LENGTH, w->m->units, system->length).s, joints,
                   kent_text_of(&where));
    if (!system->fits) {
        kent_notes_warn(notes, "not every leg of that system fits: it holds only once "
                               "what breaks it is tied across or held by itself");
    }
    if (!is_turn(v) && !is_ended(v)) {
        kent_notes_warn(notes,
                        "the pushes of that system are not added up: each leg of "
                        "it runs as far as its own fitting asks, and whether that "
                        "holds them together is not judged");
    }
    const bool lost = names.failed || where.failed || notes->failed;
    kent_text_clear(&names);
    kent_text_clear(&where);
    return !lost;
}

/* ---- what that means for each fitting -------------------------------------------- */

static void lose(kent_restraints *r, kent_holding *h)
{
    r->concrete -= h->block.volume + h->block.face_volume;
    h->block = kent_block_none();
    h->held = false;
    h->utilisation = h->factor_reached = NAN;
    r->not_held++;
}

/* A leg that the system made longer is its fitting's. */
static bool tell_longer(const kent_system_work *w, const kent_system_leg *leg)
{
    const kent_leg *own = own_leg(w, leg);
    kent_holding *h = &w->r->fittings[leg->fitting];
    const kent_port *p = port_of(w, leg);
    const double use = kent_leg_use(w->m, &w->m->fittings[leg->fitting], own);

    h->restrained_length = fmax(h->restrained_length, own->length);
    kent_notes_add(&h->cautions,
                   "as part of a system its leg%s%s runs over %s, longer than by "
                   "itself%s",
                   p->toward >= 0 ? " towards " : "",
                   p->toward >= 0 ? w->m->points[p->toward].id : "",
                   kent_said_of(KENT_LENGTH, w->m->units, own->length).s,
                   own->fits ? "" : ", and does not fit");
    if (h->held && !own->fits) {
        lose(w->r, h);
    } else if (h->held && own->end == KENT_LEG_IN_GROUND && use > h->utilisation) {
        h->utilisation = use;
        h->factor_reached = h->factor_asked / use;
    }
    return !h->cautions.failed && !h->derivation.failed;
}

/* A leg that counts on a dead end to be held with it, and it is not. */
static bool tell_alone(const kent_system_work *w, const kent_system_leg *leg)
{
    if (!leads_out(leg) || leg->walk.end != KENT_LEG_AT_DEAD_END) return true;
    kent_holding *h = &w->r->fittings[leg->fitting];
    if (w->r->fittings[leg->walk.fitting].needs_nothing) return true;
    own_leg(w, leg)->fits = false;
    kent_notes_warn(&h->cautions,
                    "the restrained length reaches %s, whose own is not known: nothing "
                    "tells that the two hold each other",
                    w->m->fittings[leg->walk.fitting].id);
    if (h->held) lose(w->r, h);
    return !h->cautions.failed;
}

bool kent_system_tell(kent_system_work *w)
{
    bool told = true;
    size_t system = 0;

    w->r->systems.outer_count = 0;
    for (size_t i = 0; i < w->leg_count; system++) {
        kent_system_of *of = &w->r->systems.at[system];
        const size_t count = kent_system_legs(w, i);
        for (size_t k = i; k < i + count; k++) {
            told = tell_alone(w, &w->legs[k]) && told;
        }
        tell_outers(w, of, &w->legs[i], count);
        of->offset = has_offset(w, &w->legs[i], count);
        of->across = tell_across(w, &w->legs[i], count);
        for (size_t k = i; k < i + count; k++) {
            if (w->legs[k].leg == SIZE_MAX || !own_leg(w, &w->legs[k])->lengthened) {
                continue;
            }
            told = tell_longer(w, &w->legs[k]) && told;
        }
        const system_view v = view_of(w, &w->legs[i], count);
        told = tell_system(w, of, &v) && told;
        i += count;
    }
    return told;
}
