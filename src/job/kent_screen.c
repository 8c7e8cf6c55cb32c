#include "kent_screen.h"

#include <math.h>
#include <stdlib.h>

/* Share of the A/a of the pipe that a wave comes by, from which the other pipes of a
 * junction throw back at least half of it, with the sign turned: (1 - 3)/(1 + 3). */
static const double LARGE = 3.0;

/* What moved: its flow before, the largest change of it, and how long that took. */
typedef struct moved {
    int node;      /* where its path starts; -1: none */
    double before; /* m3/s, out of that node's pipes: positive where it draws */
    double change; /* m3/s, of that */
    double time;   /* s; NAN */
} moved;

/* ---- the path -------------------------------------------------------------------- */

typedef struct path {
    kent_path_end end;
    int node;
    double length, time; /* m, s one way */
} path;

/* Of one node while the nearest end is looked for. */
typedef struct reach {
    double time, length; /* s, m; time INFINITY: not reached */
    int span;            /* that it was reached by; -1 */
    bool done;
} reach;

static bool has_tank(const kent_model *m, int node, int scenario)
{
    const kent_node *n = &m->nodes[node];
    for (size_t k = 0; k < n->stand_count; k++) {
        const int device = m->stands[n->stand_first + k];
        const kent_device_kind kind = m->devices[device].kind;
        if (kind != KENT_DEVICE_SURGE_TANK && kind != KENT_DEVICE_AIR_VESSEL) continue;
        if (!kent_device_is_left_out(m, (size_t)device, scenario)) return true;
    }
    return false;
}

static double width_of(const kent_span *s) { return s->area / s->wave_speed; }

static bool is_large_junction(const kent_model *m, int node, int by)
{
    const kent_node *n = &m->nodes[node];
    double others = 0.0;
    for (size_t k = 0; k < n->end_count; k++) {
        const int span = m->ends[n->end_first + k].span;
        if (span != by) others += width_of(&m->spans[span]);
    }
    return others >= LARGE * width_of(&m->spans[by]);
}

static kent_path_end end_at(const kent_model *m, int node, int by, int scenario)
{
    if (m->nodes[node].kind == KENT_NODE_FIXED_LEVEL) return KENT_PATH_LEVEL;
    if (has_tank(m, node, scenario)) return KENT_PATH_TANK;
    if (by >= 0 && is_large_junction(m, node, by)) return KENT_PATH_JUNCTION;
    return KENT_PATH_NONE;
}

static int nearest_open(const reach *at, size_t count)
{
    int nearest = -1;
    for (size_t i = 0; i < count; i++) {
        if (at[i].done || isinf(at[i].time)) continue;
        if (nearest < 0 || at[i].time < at[nearest].time) nearest = (int)i;
    }
    return nearest;
}

static void spread(const kent_model *m, reach *at, int node)
{
    const kent_node *n = &m->nodes[node];
    for (size_t k = 0; k < n->end_count; k++) {
        const kent_end end = m->ends[n->end_first + k];
        const kent_span *s = &m->spans[end.span];
        reach *other = &at[s->node[1 - end.side]];
        const double time = at[node].time + s->length / s->wave_speed;
        if (other->done || time >= other->time) continue;
        *other = (reach){time, at[node].length + s->length, end.span, false};
    }
    for (size_t i = 0; i < m->valve_count; i++) { /* an open one lets waves past */
        const kent_valve *v = &m->valves[i];
        const int side = v->node[0] == node ? 0 : v->node[1] == node ? 1 : -1;
        if (side < 0 || v->node[1] < 0 || !(v->opening > 0.0)) continue;
        reach *other = &at[v->node[1 - side]];
        if (other->done || at[node].time >= other->time) continue;
        *other = (reach){at[node].time, at[node].length, at[node].span, false};
    }
}

/* By the time that a wave takes; not across barred nodes, the other side of what
 * moves (-1: none). */
static path nearest_end(const kent_model *m, int start, int barred, int scenario,
                        bool *failed)
{
    path found = {KENT_PATH_NONE, -1, NAN, NAN};
    reach *at = kent_alloc(m->node_count, sizeof *at);
    if (!at) {
        *failed = true;
        return found;
    }
    for (size_t i = 0; i < m->node_count; i++) {
        at[i] = (reach){INFINITY, 0.0, -1, (int)i == barred};
    }
    at[start].time = 0.0;
    for (int node = start; node >= 0; node = nearest_open(at, m->node_count)) {
        at[node].done = true;
        const kent_path_end end =
            node == start ? KENT_PATH_NONE : end_at(m, node, at[node].span, scenario);
        if (end != KENT_PATH_NONE) {
            found = (path){end, node, at[node].length, at[node].time};
            break;
        }
        spread(m, at, node);
    }
    free(at);
    return found;
}

/* ---- what moved ------------------------------------------------------------------ */

/* The change of a flow from the first instant to the one farthest from it. */
static double change_of(const double *flow, size_t count, size_t stride)
{
    double change = 0.0;
    for (size_t i = 1; i < count; i++) {
        const double by = flow[i * stride] - flow[0];
        if (fabs(by) > fabs(change)) change = by;
    }
    return change;
}

/* A valve's: from its history, which is its own flow (see kent_viewpoint). The path is
 * on the side that the water comes from. */
static moved valve_moved(const kent_results *r, const kent_scenario_result *run,
                         int valve)
{
    const kent_model *m = r->model;
    const kent_valve *v = &m->valves[valve];
    const kent_history *h = &run->history;
    const double q = r->steadies[run->state]->valve_flow[valve];
    const bool forward = q >= 0.0 || v->node[1] < 0;
    moved of = {forward ? v->node[0] : v->node[1], forward ? q : -q, NAN, NAN};
    for (size_t i = 0; i < r->history_count; i++) {
        if (r->history_points[i] != v->point) continue;
        const double *flow = h->flow + i;
        of.change = (forward ? 1.0 : -1.0) * change_of(flow, h->rows, h->watch_count);
        of.time =
            kent_screening_effective_time(h->time, 1, flow, h->watch_count, h->rows);
    }
    return of;
}

/* A pump gives to its delivery node: what it draws there is its flow with the sign
 * turned. */
static moved pump_moved(const kent_results *r, const kent_scenario_result *run,
                        int pump)
{
    const kent_model *m = r->model;
    const kent_history *h = &run->history;
    moved of = {-1, NAN, NAN, NAN};
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        if (d->kind != KENT_DEVICE_PUMP || d->index != pump) continue;
        const size_t stride = sizeof *h->devices / sizeof(double) * h->device_count;
        const double *flow = &h->devices[i].flow;
        of.node = d->node[1];
        of.before = -r->steadies[run->state]->device_flow[i];
        of.change = -change_of(flow, h->rows, stride);
        of.time = kent_screening_effective_time(h->time, 1, flow, stride, h->rows);
    }
    return of;
}

/* An outflow changes as its event says, not by the pressure. */
static moved outflow_moved(const kent_results *r, const kent_scenario_result *run,
                           const kent_event *e)
{
    const kent_model *m = r->model;
    const double before = r->steadies[run->state]->outflow[e->target];
    moved of = {m->outflows[e->target].node, before, e->to - before, e->ramp_time};
    if (e->law_count == 0) return of;
    const kent_law_point *law = &m->law[e->law_first];
    const size_t stride = sizeof *law / sizeof(double);
    of.change = change_of(&law->value, e->law_count, stride);
    of.time = kent_screening_effective_time(&law->time, stride, &law->value, stride,
                                            e->law_count);
    return of;
}

/* ---- the figures ----------------------------------------------------------------- */

/* The widest pipe at a node: what moves there moves it. */
static int widest_at(const kent_model *m, int node)
{
    int widest = -1;
    for (size_t k = 0; k < m->nodes[node].end_count; k++) {
        const int span = m->ends[m->nodes[node].end_first + k].span;
        if (widest < 0 || m->spans[span].area > m->spans[widest].area) widest = span;
    }
    return widest;
}

static void set_path(const kent_results *r, const kent_scenario_result *run, int start,
                     int barred, kent_screen *s, bool *failed)
{
    const kent_model *m = r->model;
    const path p = nearest_end(m, start, barred, run->scenario, failed);
    s->end = p.end;
    s->end_point = p.node >= 0 ? m->nodes[p.node].point : -1;
    s->length = p.length;
    s->return_time = 2.0 * p.time;
}

static void set_pressures(const kent_results *r, kent_screen *s)
{
    const kent_model *m = r->model;
    const double change = fabs(s->velocity);
    s->wave_speed = m->spans[s->span].wave_speed;
    s->per_velocity = kent_screening_sudden(m->water.density, s->wave_speed, 1.0);
    s->sudden = s->per_velocity * change;
    s->linear = kent_screening_linear(s->sudden, s->return_time, s->time);
    if (isnan(s->return_time) || isnan(s->time)) s->linear = NAN;
    s->slow = s->time > s->return_time
                  ? kent_screening_slow(m->water.density, s->length, change, s->time)
                  : NAN;
}

/* Of the pipe's own end: two may meet at a point with something between them. */
static void set_march(const kent_results *r, const kent_scenario_result *run, int node,
                      kent_screen *s)
{
    const kent_model *m = r->model;
    const double weight = m->water.density * m->gravity;
    const double before = r->steadies[run->state]->node_head[node];
    const int at = m->spans[s->span].node[0] == node ? 0 : run->grid->reaches[s->span];
    s->rise = weight * (run->highest[s->span][at] - before);
    s->fall = weight * (before - run->lowest[s->span][at]);
}

static bool screen_event(const kent_results *r, const kent_scenario_result *run,
                         const kent_event *e, kent_screen *s, bool *failed)
{
    const kent_model *m = r->model;
    moved of = {-1, NAN, NAN, NAN};
    int barred = -1;
    switch (e->kind) {
    case KENT_EVENT_VALVE:
        of = valve_moved(r, run, e->target);
        barred = m->valves[e->target].node[of.node == m->valves[e->target].node[0]];
        break;
    case KENT_EVENT_PUMP:
        of = pump_moved(r, run, e->target);
        break;
    case KENT_EVENT_OUTFLOW:
        of = outflow_moved(r, run, e);
        break;
    case KENT_EVENT_FIXED_LEVEL:
    case KENT_EVENT_BURST:
        return false;
    }
    if (of.node < 0 || widest_at(m, of.node) < 0) return false;
    *s = (kent_screen){.kind = e->kind, .target = e->target};
    s->point = m->nodes[of.node].point;
    s->span = widest_at(m, of.node);
    s->velocity = -of.change / m->spans[s->span].area;
    s->time = of.time;
    set_path(r, run, of.node, barred, s, failed);
    set_pressures(r, s);
    set_march(r, run, of.node, s);
    return true;
}

size_t kent_screen_of(const kent_results *r, size_t march, kent_screen *out,
                      size_t most, bool *failed)
{
    const kent_model *m = r->model;
    const kent_scenario_result *run = &r->scenarios[march];
    const kent_scenario *given = &m->scenarios[run->scenario];
    size_t count = 0;
    for (size_t i = 0; i < given->event_count; i++) {
        const kent_event *e = &m->events[given->event_first + i];
        kent_screen s;
        bool again = false;
        for (size_t k = 0; k < i; k++) {
            const kent_event *other = &m->events[given->event_first + k];
            again = again || (other->kind == e->kind && other->target == e->target);
        }
        if (again || !screen_event(r, run, e, &s, failed)) continue;
        if (count < most) out[count] = s;
        count++;
    }
    return count;
}
