#include "kent_leg_internal.h"
#include "kent_block_internal.h"
#include "kent_said.h"

#include <assert.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;

/* Below this turn (rad) a thrust along the bisector says nothing about a leg's pull. */
static const double LEAST_TURN = 1e-6;

/* m: places nearer than this along a pipe are one place. */
static const double SAME_PLACE = 1e-6;

static const kent_leg_rule RULES[] = {
    {0, 2, "on each leg", KENT_BEND, true, false},
    {2, KENT_PORTS, "on the branch", KENT_TEE, false, false},
    {2, KENT_PORTS, "on the branch", KENT_WYE, false, false},
    {2, KENT_PORTS, "on each branch", KENT_CROSS, false, false},
    {0, 2, "on either leg alone", KENT_REDUCER, false, true},
    {0, 1, "behind the end", KENT_DEAD_END, false, false},
    {0, 2, "on both sides, for a push from either", KENT_VALVE, false, false},
    {0, 0, "nowhere", KENT_STRAIGHT, false, false},
    {0, 0, "nowhere", KENT_CURVE, false, false},
    {0, KENT_PORTS, "on each outer leg", KENT_GROUP, false, false},
};

static const kent_leg_rule TURNED_REDUCER = {0,     2,    "on each leg", KENT_REDUCER,
                                             false, false};

const kent_leg_rule *kent_leg_rule_of(const kent_fitting *fitting)
{
    const size_t count = sizeof RULES / sizeof RULES[0];
    const kent_fitting_type type = fitting->type;
    size_t i = 0;

    if (type == KENT_REDUCER && fitting->angle > LEAST_TURN) return &TURNED_REDUCER;
    while (i + 1 < count && RULES[i].type != type) {
        i++;
    }
    assert(RULES[i].type == type); /* every type has a row */
    return &RULES[i];
}

/* Whether it bears at some depth. */
static bool soil_bears(const kent_soil *soil)
{
    switch (soil->route) {
    case KENT_BEARING_CONSTANT:
        return soil->allowable_bearing > 0.0;
    case KENT_BEARING_BY_DEPTH:
        return soil->by_depth_count > 0 &&
               soil->by_depth[soil->by_depth_count - 1].bearing > 0.0;
    case KENT_BEARING_GRADIENT:
        return soil->bearing_gradient > 0.0;
    case KENT_BEARING_PASSIVE:
        return soil->passive_share > 0.0;
    }
    return false;
}

bool kent_soil_counts(const kent_soil *soil)
{
    return soil != NULL && !soil->unreliable && soil->nature == KENT_NATURAL &&
           soil_bears(soil);
}

const kent_soil *kent_point_soil(const kent_model *m, int point)
{
    const int own = point >= 0 ? m->points[point].soil : -1;
    const int soil = own >= 0 ? own : m->ground.soil;
    return soil >= 0 ? &m->soils[soil] : NULL;
}

bool kent_leg_bears(const kent_fitting *fitting, kent_vec3 thrust)
{
    const double lifted = KENT_BLOCK_NEGLIGIBLE * kent_vec3_length(thrust);

    if (fitting->type != KENT_BEND || fitting->orientation == KENT_CREST) return false;
    return thrust.z <= lifted;
}

/* ---- one leg --------------------------------------------------------------------- */

unsigned kent_leg_prepare(const kent_model *m, const kent_fitting *fitting, size_t port,
                          kent_vec3 thrust, double factor, kent_leg_work *out)
{
    const kent_port *p = &m->ports[fitting->port_first + port];
    const kent_leg_rule *rule = kent_leg_rule_of(fitting);
    const double push = kent_vec3_length(thrust);

    *out = (kent_leg_work){.factor = factor, .angle = fitting->angle, .length = NAN};
    out->bend = rule->bend && fitting->angle > LEAST_TURN;
    out->turns_back = out->bend && fitting->angle > 0.5 * PI + LEAST_TURN;
    out->bears = !out->turns_back && kent_leg_bears(fitting, thrust);
    if (p->span < 0) return KENT_LACK_PIPE;
    out->pipe = &m->pipes[m->spans[p->span].pipe];

    /* what a resistance of 1 N/m would need as a length, it needs as a force */
    out->force = push;
    if (out->bend) out->force = push / (2.0 * sin(0.5 * fitting->angle)); /* 11.8 */
    out->demand =
        out->bend && !out->turns_back
            ? kent_restrained_length_bend(out->force, fitting->angle, factor, 1.0, 0.0)
            : kent_restrained_length_end(out->force, factor, 1.0);
    return kent_leg_pieces(m, fitting, p, out);
}

/* ---- how far it may run ---------------------------------------------------------- */

static int standing_compare(const void *left, const void *right)
{
    const kent_standing *a = left, *b = right;

    if (a->span != b->span) return a->span < b->span ? -1 : 1;
    if (a->chainage < b->chainage) return -1;
    if (a->chainage > b->chainage) return 1;
    return (a->fitting > b->fitting) - (a->fitting < b->fitting);
}

kent_status kent_standings_find(const kent_model *m, kent_standings *out,
                                kent_error *err)
{
    kent_standing *at = kent_alloc(m->port_count, sizeof *at);
    size_t count = 0;

    if (!at) return kent_error_nomem(err);
    for (size_t i = 0; i < m->fitting_count; i++) {
        const kent_fitting *f = &m->fittings[i];
        for (size_t k = 0; k < f->port_count; k++) {
            const kent_port *p = &m->ports[f->port_first + k];
            if (p->span < 0) continue;
            at[count++] = (kent_standing){p->span, (int)i, p->chainage};
        }
    }
    if (count > 0) qsort(at, count, sizeof *at, standing_compare);
    *out = (kent_standings){.at = at, .count = count};
    return KENT_OK;
}

void kent_standings_clear(kent_standings *s)
{
    free(s->at);
    *s = (kent_standings){0};
}

/* First standing that is not before (span, chainage). */
static size_t standing_search(const kent_standings *standings, int span,
                              double chainage)
{
    size_t lo = 0, hi = standings->count;

    while (lo < hi) {
        const size_t mid = lo + (hi - lo) / 2;
        const kent_standing *s = &standings->at[mid];
        if (s->span < span || (s->span == span && s->chainage < chainage)) {
            lo = mid + 1;
        } else {
            hi = mid;
        }
    }
    return lo;
}

/* Looks at the fittings between the leg's start and its end; a bend on the way makes
 * one system of both, anything else breaks the leg. */
static bool leg_meets(const kent_model *m, const kent_standings *standings,
                      size_t fitting, const kent_port *p, double length,
                      kent_notes *notes)
{
    const bool ahead = p->sign > 0.0;
    const double from = ahead ? p->chainage : p->chainage - length;
    const double to = ahead ? p->chainage + length : p->chainage;

    for (size_t i = standing_search(standings, p->span, from - SAME_PLACE);
         i < standings->count; i++) {
        const kent_standing *s = &standings->at[i];
        if (s->span != p->span || s->chainage > to + SAME_PLACE) break;
        const kent_fitting *f = &m->fittings[s->fitting];
        if ((size_t)s->fitting == fitting || f->within_deflection) continue;
        if (f->type == KENT_STRAIGHT) continue;
        if (f->type != KENT_BEND) {
            kent_notes_add(notes,
                           "the restrained length reaches %s: restrain every joint up "
                           "to it and treat both as one system",
                           f->id);
            return false;
        }
        kent_notes_add(notes,
                       "restrained lengths meet at %s: restrain every joint between; "
                       "the two are one system",
                       f->id);
    }
    return true;
}

/* Whether the ground along the leg can be relied on at every point of it: at those with
 * a soil of their own, and within its first `own` (m), where the fitting's ground is
 * taken to go on. */
static bool leg_ground(const kent_model *m, const kent_port *p, double length,
                       double own, kent_notes *notes)
{
    const kent_span *span = &m->spans[p->span];
    const bool ahead = p->sign > 0.0;
    const double from = ahead ? p->chainage + SAME_PLACE : p->chainage - length;
    const double to = ahead ? p->chainage + length : p->chainage - SAME_PLACE;
    const size_t end = span->route_first + span->route_count;

    for (size_t i = kent_stop_search(m, span->route_first, span->route_count, from);
         i < end; i++) {
        const double there = m->chainage[i] - m->chainage[span->route_first];
        if (there > to) break;
        const bool beyond = fabs(there - p->chainage) > own;
        if (beyond && m->points[m->route[i]].soil < 0) continue; /* it is a piece's */
        const kent_soil *soil = kent_point_soil(m, m->route[i]);
        if (!soil || kent_soil_counts(soil)) continue; /* not stated: the fitting's */
        kent_notes_add(notes,
                       "the restrained length runs into ground at %s that gives no "
                       "restraint: carry it through by as much again as lies there",
                       m->points[m->route[i]].id);
        return false;
    }
    return true;
}

bool kent_leg_fits(const kent_model *m, const kent_standings *standings, size_t fitting,
                   size_t port, double length, double own, kent_notes *notes)
{
    const kent_fitting *f = &m->fittings[fitting];
    const kent_port *p = &m->ports[f->port_first + port];
    const kent_span *span = &m->spans[p->span];
    const double there = p->sign > 0.0 ? span->length - p->chainage : p->chainage;

    if (!leg_meets(m, standings, fitting, p, fmin(length, there), notes)) return false;
    if (!leg_ground(m, p, fmin(length, there), own, notes)) return false;
    if (length <= there + SAME_PLACE) return true;
    const int node = span->node[p->sign > 0.0 ? 1 : 0];
    kent_notes_add(
        notes,
        "the restrained length of %s is longer than the %s of pipe up to %s: "
        "restrain every joint and anchor the rest there",
        kent_said_of(KENT_LENGTH, m->units, length).s,
        kent_said_of(KENT_LENGTH, m->units, there).s,
        m->points[m->nodes[node].point].id);
    return false;
}
