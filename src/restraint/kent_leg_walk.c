/* Where a leg leads: along its pipe and on through the next, to what ends it. */
#include "kent_leg_internal.h"
#include "kent_side_internal.h"

#include <limits.h>
#include <stdlib.h>

/* ---- where fittings stand -------------------------------------------------------- */

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

/* ---- what ends a leg ------------------------------------------------------------- */

/* The nearest that ends it on one pipe, so far. */
typedef struct walk_stop {
    kent_leg_end end; /* KENT_LEG_IN_GROUND: nothing yet */
    double away;      /* m from where the leg enters the pipe */
    int point, fitting;
} walk_stop;

static void stop_at(walk_stop *stop, kent_leg_end end, double away, int point,
                    int fitting)
{
    if (!(away < stop->away - KENT_SAME_PLACE)) return;
    *stop = (walk_stop){end, away, point, fitting};
}

/* Whether a leg may run through a tee: along a run whose joints are said to be
 * restrained on both sides. */
static bool runs_through(const kent_model *m, const kent_fitting *f, int span)
{
    if (f->type != KENT_TEE || f->port_count < 2) return false;
    const kent_port *p = &m->ports[f->port_first];
    const bool along = p[0].span == span || p[1].span == span;
    return along && f->stated.run_length[0] > 0.0 && f->stated.run_length[1] > 0.0;
}

/* What a fitting that stands in its way does to a leg. */
static kent_leg_end end_at(const kent_model *m, const kent_fitting *f, int span)
{
    if (f->role == KENT_ROLE_WALL) return KENT_LEG_AT_STRUCTURE;
    if (f->role == KENT_ROLE_FLANGE_ADAPTOR) return KENT_LEG_AT_FITTING;
    if (f->within_deflection || f->type == KENT_STRAIGHT || f->type == KENT_BEND) {
        return KENT_LEG_IN_GROUND;
    }
    if (f->type == KENT_DEAD_END && f->restraint == KENT_RESTRAINED_JOINTS) {
        return KENT_LEG_AT_DEAD_END;
    }
    return runs_through(m, f, span) ? KENT_LEG_IN_GROUND : KENT_LEG_AT_FITTING;
}

/* Fittings on one span within a length (m) of the way. */
static void stop_by_fittings(const kent_model *m, const kent_standings *standings,
                             size_t fitting, kent_along way, size_t span, double length,
                             walk_stop *stop)
{
    const double start = kent_span_start(m, &m->spans[span]);

    for (size_t i = standing_search(standings, (int)span, -INFINITY);
         i < standings->count && standings->at[i].span == (int)span; i++) {
        const kent_standing *s = &standings->at[i];
        const double there = start + s->chainage;
        const double away = way.ahead ? there - way.at : way.at - there;
        const kent_fitting *f = &m->fittings[s->fitting];
        if ((size_t)s->fitting == fitting) continue;
        if (away < -KENT_SAME_PLACE || away > length + KENT_SAME_PLACE) continue;
        const kent_leg_end end = end_at(m, f, (int)span);
        if (end == KENT_LEG_IN_GROUND) continue;
        stop_at(stop, end, fmax(0.0, away), f->point, s->fitting);
    }
}

/* A level that stands at the far end of a span, or at one that pipes of another main
 * leave from, ends a leg. */
static void stop_by_node(const kent_model *m, kent_along way, size_t span,
                         double length, walk_stop *stop)
{
    const kent_span *s = &m->spans[span];
    const double start = kent_span_start(m, s);
    const double there = way.ahead ? start + s->length : start;
    const double away = way.ahead ? there - way.at : way.at - there;
    const kent_node *node = &m->nodes[s->node[way.ahead ? 1 : 0]];

    if (node->kind != KENT_NODE_FIXED_LEVEL || away < KENT_SAME_PLACE ||
        away > length - KENT_SAME_PLACE) {
        return;
    }
    stop_at(stop, KENT_LEG_AT_PIPE_END, away, node->point, -1);
}

/* Points on the way whose ground can't be relied on: those with a soil of their own,
 * and within the first `own` (m), where the fitting's ground is taken to go on. */
static void stop_by_ground(const kent_model *m, kent_along way, double length,
                           double own, walk_stop *stop)
{
    const kent_pipe *pipe = &m->pipes[way.pipe];
    const double start = m->chainage[pipe->route_first];
    const size_t end = pipe->route_first + pipe->route_count;
    const double from = way.ahead ? way.at + KENT_SAME_PLACE : way.at - length;
    const double to = way.ahead ? way.at + length : way.at - KENT_SAME_PLACE;

    if (pipe->above_ground) return;
    for (size_t i = kent_stop_search(m, pipe->route_first, pipe->route_count, from);
         i < end; i++) {
        const double there = m->chainage[i] - start;
        const double away = fabs(there - way.at);
        if (there > to) break;
        if (away > own && m->points[m->route[i]].soil < 0) continue; /* a piece's */
        const kent_soil *soil = kent_point_soil(m, m->route[i]);
        if (!soil || kent_soil_counts(soil)) continue; /* not stated: the fitting's */
        if (kent_model_ground_at(m, way.pipe, there).casing) continue;
        stop_at(stop, KENT_LEG_AT_SOFT, away, m->route[i], -1);
    }
}

/* ---- on the way ------------------------------------------------------------------ */

static void pass(kent_leg_walk *walk, int fitting)
{
    for (size_t i = 0; i < walk->passed_count; i++) {
        if (walk->passed[i] == fitting) return;
    }
    if (walk->passed_count == KENT_LEG_PASSED) return; /* those named are enough */
    walk->passed[walk->passed_count++] = fitting;
}

/* What ends a leg is not passed. */
static void unpass(kent_leg_walk *walk, int fitting)
{
    size_t kept = 0;

    for (size_t i = 0; i < walk->passed_count; i++) {
        if (walk->passed[i] != fitting) walk->passed[kept++] = walk->passed[i];
    }
    walk->passed_count = kept;
}

/* The bends and tees within a length (m) of the way on one span. */
static void pass_span(const kent_model *m, const kent_standings *standings,
                      size_t fitting, kent_along way, size_t span, double length,
                      kent_leg_walk *walk)
{
    const double start = kent_span_start(m, &m->spans[span]);

    for (size_t i = standing_search(standings, (int)span, -INFINITY);
         i < standings->count && standings->at[i].span == (int)span; i++) {
        const kent_standing *s = &standings->at[i];
        const double there = start + s->chainage;
        const double away = way.ahead ? there - way.at : way.at - there;
        const kent_fitting *f = &m->fittings[s->fitting];
        if ((size_t)s->fitting == fitting || f->within_deflection) continue;
        if (away < -KENT_SAME_PLACE || away > length + KENT_SAME_PLACE) continue;
        if (f->type == KENT_BEND || f->type == KENT_TEE) pass(walk, s->fitting);
    }
}

/* Whether a span is of the pipe and begins before a chainage (m). */
static bool span_is_met(const kent_model *m, int pipe, size_t span, double high)
{
    return m->spans[span].pipe == pipe && kent_span_start(m, &m->spans[span]) < high;
}

/* One pipe of the way, up to a length (m): where it stops, and what it passes. */
static walk_stop walk_pipe(const kent_model *m, const kent_standings *standings,
                           size_t fitting, kent_along way, double length, double own,
                           kent_leg_walk *walk)
{
    walk_stop stop = {KENT_LEG_IN_GROUND, INFINITY, -1, -1};
    const double low = fmin(way.at, kent_along_place(way, length));
    const size_t first = kent_pipe_span_at(m, way.pipe, low - KENT_SAME_PLACE);
    const double high = fmax(way.at, kent_along_place(way, length)) + KENT_SAME_PLACE;

    for (size_t i = first; i < m->span_count && span_is_met(m, way.pipe, i, high);
         i++) {
        stop_by_fittings(m, standings, fitting, way, i, length, &stop);
        stop_by_node(m, way, i, length, &stop);
    }
    stop_by_ground(m, way, length, own, &stop);
    const double reach = fmin(length, stop.away);
    for (size_t i = first; i < m->span_count && span_is_met(m, way.pipe, i, high);
         i++) {
        pass_span(m, standings, fitting, way, i, reach, walk);
    }
    unpass(walk, stop.fitting);
    return stop;
}

static void walk_run(kent_leg_walk *walk, kent_along way, double length)
{
    const double to = kent_along_place(way, length);

    if (walk->run_count == KENT_LEG_RUNS) return;
    walk->run[walk->run_count++] =
        (kent_leg_run){way.pipe, fmin(way.at, to), fmax(way.at, to)};
    walk->reach += length;
}

static void walk_ends(kent_leg_walk *walk, kent_leg_end end, int point, int fitting)
{
    walk->end = end;
    walk->point = point;
    walk->fitting = fitting;
}

/* The point at which the way's pipe ends. */
static int way_point(const kent_model *m, kent_along way)
{
    const kent_pipe *p = &m->pipes[way.pipe];
    return m->route[p->route_first + (way.ahead ? p->route_count - 1 : 0)];
}

kent_leg_walk kent_leg_walk_of(const kent_model *m, const kent_standings *standings,
                               size_t fitting, const kent_port *port, double length,
                               double own)
{
    kent_leg_walk walk = {.end = KENT_LEG_IN_GROUND, .point = -1, .fitting = -1};
    kent_along way = kent_along_of(m, port);

    for (;;) {
        const double left = length - walk.reach, whole = kent_along_left(m, way);
        const walk_stop stop = walk_pipe(m, standings, fitting, way, fmin(left, whole),
                                         own - walk.reach, &walk);
        if (stop.end != KENT_LEG_IN_GROUND) {
            walk_run(&walk, way, stop.away);
            walk_ends(&walk, stop.end, stop.point, stop.fitting);
            return walk;
        }
        walk_run(&walk, way, fmin(left, whole));
        if (left <= whole + KENT_SAME_PLACE) return walk;
        const int point = way_point(m, way);
        if (walk.run_count == KENT_LEG_RUNS || !kent_along_on(m, way, &way)) {
            walk_ends(&walk, KENT_LEG_AT_PIPE_END, point, -1);
            return walk;
        }
    }
}

/* ---- how it ended ---------------------------------------------------------------- */

bool kent_leg_end_fits(kent_leg_end end)
{
    switch (end) {
    case KENT_LEG_IN_GROUND:
    case KENT_LEG_AT_STRUCTURE:
    case KENT_LEG_AT_DEAD_END:
        return true;
    case KENT_LEG_AT_FITTING:
    case KENT_LEG_AT_SOFT:
    case KENT_LEG_AT_PIPE_END:
        break;
    }
    return false;
}

const char *kent_leg_end_word(kent_leg_end end)
{
    switch (end) {
    case KENT_LEG_IN_GROUND:
        return "in-ground";
    case KENT_LEG_AT_STRUCTURE:
        return "structure";
    case KENT_LEG_AT_DEAD_END:
        return "dead-end";
    case KENT_LEG_AT_FITTING:
        return "fitting";
    case KENT_LEG_AT_SOFT:
        return "soft-ground";
    case KENT_LEG_AT_PIPE_END:
        return "pipe-end";
    }
    return "";
}

int kent_leg_whole(const kent_model *m, const kent_leg_walk *walk, double *length)
{
    double pipes = 0.0;

    *length = walk->reach;
    for (size_t i = 0; i < walk->run_count; i++) {
        const kent_leg_run *run = &walk->run[i];
        const double laying = m->pipes[run->pipe].laying_length;
        const double laid = run->to - run->from;
        if (!(laying > 0.0)) return 0;
        const double whole = ceil(laid / laying - KENT_SIDE_SLACK);
        pipes += whole;
        if (i + 1 == walk->run_count) *length += whole * laying - laid;
    }
    if (pipes < 1.0) { /* the fitting's own joint all the same */
        pipes = 1.0;
        *length = m->pipes[walk->run[0].pipe].laying_length;
    }
    return pipes < INT_MAX ? (int)pipes : INT_MAX;
}
