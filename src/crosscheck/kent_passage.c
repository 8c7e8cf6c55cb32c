#include "kent_passage_internal.h"

#include <math.h>
#include <stdlib.h>

/* m3/s: below it q|q| goes over into a straight line. */
static const double STILL = 1e-7;
/* m: below it sqrt(drop) does. */
static const double LEVEL_OFF = 1e-6;

double kent_passage_square(double flow, double *derivative)
{
    const double size = hypot(flow, STILL);
    *derivative = size + flow * flow / size;
    return flow * size;
}

double kent_passage_loss(double k, double flow, double *derivative)
{
    const double square = kent_passage_square(flow, derivative);
    *derivative *= k;
    return k * square;
}

kent_opening kent_passage_opening(double e, double conductance, double flow,
                                  double drop)
{
    if (!(e > 0.0)) return (kent_opening){flow, 1.0, 0.0, 0.0};
    if (e < conductance) { /* less than 1 m of pipe's head at 1 m of its own */
        const double size = hypot(drop, LEVEL_OFF);
        const double root = sqrt(size);
        const double by_drop = (1.0 - 0.5 * drop * drop / (size * size)) / root;
        return (kent_opening){flow - e * drop / root, 1.0, -e * by_drop, -drop / root};
    }
    double by_flow = 0.0;
    const double square = kent_passage_square(flow, &by_flow);
    return (kent_opening){square - e * e * drop, by_flow, -e * e, -2.0 * e * drop};
}

kent_opening kent_passage_one_way(double e, double conductance, double flow,
                                  double drop)
{
    if (!(drop > 0.0)) return (kent_opening){flow, 1.0, 0.0, 0.0};
    return kent_passage_opening(e, conductance, flow, drop);
}

/* ---- levels ---------------------------------------------------------------------- */

/* 17.9: H = level - k q2 of what flows out of it, q < 0 */
static void level_law(const kent_passage *l, double time, const double *u,
                      kent_law *law)
{
    const double in = fmin(u[KENT_AT_FLOW], 0.0);
    law->f = u[KENT_AT_HEAD] - kent_timetable_value(&l->timetable, time) +
             l->is.level.loss * in * in;
    law->by[KENT_AT_HEAD] = 1.0;
    law->by[KENT_AT_FLOW] = 2.0 * l->is.level.loss * in;
}

static const kent_passage_ops LEVEL = {.law = level_law};

static double largest_area(const kent_model *m, int node)
{
    double area = 0.0; /* m2 */
    const kent_node *at = &m->nodes[node];
    for (size_t i = 0; i < at->end_count; i++) {
        area = fmax(area, m->spans[m->ends[at->end_first + i].span].area);
    }
    return area;
}

/* m3/s that pipes bring to a node in the steady state. */
static double arriving(const kent_model *m, const kent_steady *s, int node)
{
    const kent_node *at = &m->nodes[node];
    double flow = 0.0;
    for (size_t i = 0; i < at->end_count; i++) {
        const kent_end *e = &m->ends[at->end_first + i];
        flow += e->side == 1 ? s->span_flow[e->span] : -s->span_flow[e->span];
    }
    return flow;
}

static kent_status add_levels(kent_passages *links, const kent_model *m,
                              const kent_steady *s, int scenario, kent_error *err)
{
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        const kent_fixed_level *f = &m->fixed_levels[i];
        const double area = f->node < 0 ? 0.0 : largest_area(m, f->node);
        if (area <= 0.0) continue; /* nothing is connected */
        const int node[2] = {f->node, -1};
        kent_passage *l =
            kent_passages_add(links, &LEVEL, m->points[f->point].id, node);
        if (!l) return kent_error_nomem(err);
        l->is.level.loss = (1.0 + f->loss) / (2.0 * m->gravity * area * area);
        l->start[0] = arriving(m, s, f->node);
        const kent_status status = kent_timetable_fill(
            &l->timetable, m, scenario, KENT_EVENT_FIXED_LEVEL, (int)i, f->level, err);
        if (status) return status;
    }
    return KENT_OK;
}

/* ---- outflows -------------------------------------------------------------------- */

/* All of a flow above some head, none below, what keeps that head in between: 17.10. As
 * one equation, q = middle of (0, q + c (H - z), Q). */
static void draw_at_any_pressure(const kent_draw_passage *d, double flow,
                                 const double *u, kent_law *law)
{
    const double q = u[KENT_AT_FLOW];
    const double held = q + d->conductance * (u[KENT_AT_HEAD] - d->level);
    if (flow <= 0.0 || held >= flow) { /* what flows in is pumped: always all */
        law->f = q - flow;
        law->by[KENT_AT_FLOW] = 1.0;
    } else if (held <= 0.0) {
        law->f = q;
        law->by[KENT_AT_FLOW] = 1.0;
    } else {
        law->f = q - held;
        law->by[KENT_AT_HEAD] = -d->conductance;
    }
}

static void draw_law(const kent_passage *l, double time, const double *u, kent_law *law)
{
    const kent_draw_passage *d = &l->is.draw;
    const double flow = kent_timetable_value(&l->timetable, time);
    if (flow <= 0.0 || d->full <= 0.0) {
        draw_at_any_pressure(d, flow, u, law);
        return;
    }
    /* 17.11: q = Q sqrt(h/full), h within 0 .. full */
    const double share = (u[KENT_AT_HEAD] - d->level) / d->full;
    law->f = kent_passage_square(u[KENT_AT_FLOW], &law->by[KENT_AT_FLOW]) -
             flow * flow * fmin(fmax(share, 0.0), 1.0);
    if (share > 0.0 && share < 1.0) law->by[KENT_AT_HEAD] = -flow * flow / d->full;
}

static const kent_passage_ops DRAW = {.law = draw_law};

static kent_status add_draws(kent_passages *links, const kent_model *m,
                             const kent_steady *s, int scenario, kent_error *err)
{
    for (size_t i = 0; i < m->outflow_count; i++) {
        const kent_outflow *o = &m->outflows[i];
        if (o->node < 0 || m->nodes[o->node].end_count == 0) continue;
        const int node[2] = {o->node, -1};
        kent_passage *l = kent_passages_add(links, &DRAW, m->points[o->point].id, node);
        if (!l) return kent_error_nomem(err);
        l->is.draw = (kent_draw_passage){
            .level = m->points[o->point].at.z,
            .full = o->pressure_dependent
                        ? o->full_pressure / (m->water.density * m->gravity)
                        : 0.0,
            .conductance = kent_node_conductance(m, o->node)};
        l->start[0] = s->outflow[i];
        const kent_status status = kent_timetable_fill(
            &l->timetable, m, scenario, KENT_EVENT_OUTFLOW, (int)i, o->flow, err);
        if (status) return status;
    }
    return KENT_OK;
}

/* ---- valves ---------------------------------------------------------------------- */

/* 17.12 */
static void gate_law(const kent_passage *l, double time, const double *u, kent_law *law)
{
    const kent_gate_passage *g = &l->is.gate;
    const double opening = kent_timetable_value(&l->timetable, time);
    const double e =
        g->capacity * kent_valve_relative_capacity(&g->valve->curve, opening);
    const double beyond = l->node[1] < 0 ? g->level : u[KENT_AT_HEAD_BEYOND];
    const kent_opening o = kent_passage_opening(e, g->conductance, u[KENT_AT_FLOW],
                                                u[KENT_AT_HEAD] - beyond);
    law->f = o.f;
    law->by[KENT_AT_FLOW] = o.by_flow;
    law->by[KENT_AT_HEAD] = o.by_drop;
    if (l->node[1] >= 0) law->by[KENT_AT_HEAD_BEYOND] = -o.by_drop;
}

static const kent_passage_ops GATE = {.law = gate_law};

static kent_status add_gates(kent_passages *links, const kent_model *m,
                             const kent_steady *s, int scenario, kent_error *err)
{
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_valve *v = &m->valves[i];
        if (v->node[0] < 0) continue;
        kent_passage *l = kent_passages_add(links, &GATE, v->id, v->node);
        if (!l) return kent_error_nomem(err);
        l->is.gate = (kent_gate_passage){v, s->valve_capacity[i], v->discharge_level,
                                         kent_passage_conductance(m, v->node)};
        l->start[0] = s->valve_flow[i];
        const kent_status status = kent_timetable_fill(
            &l->timetable, m, scenario, KENT_EVENT_VALVE, (int)i, v->opening, err);
        if (status) return status;
    }
    return KENT_OK;
}

/* ---- all of them ----------------------------------------------------------------- */

double kent_node_conductance(const kent_model *m, int node)
{
    const kent_node *at = &m->nodes[node];
    double sum = 0.0;
    for (size_t i = 0; i < at->end_count; i++) {
        const kent_span *span = &m->spans[m->ends[at->end_first + i].span];
        sum += m->gravity * span->area / span->wave_speed;
    }
    return sum;
}

double kent_passage_conductance(const kent_model *m, const int node[2])
{
    const double first = node[0] < 0 ? INFINITY : kent_node_conductance(m, node[0]);
    const double second = node[1] < 0 ? INFINITY : kent_node_conductance(m, node[1]);
    return fmin(first, second);
}

kent_passage *kent_passages_add(kent_passages *links, const kent_passage_ops *ops,
                                const char *id, const int node[2])
{
    void *link = links->link;
    if (kent_grow(&link, &links->capacity, links->count + 1, sizeof *links->link) !=
        0) {
        return NULL;
    }
    links->link = link;
    kent_passage *l = &links->link[links->count++];
    *l = (kent_passage){.ops = ops,
                        .id = id,
                        .node = {node[0], node[1]},
                        .alarm = INFINITY,
                        .root_first = links->roots};
    links->roots += ops->roots;
    for (size_t i = 0; i <= KENT_PASSAGE_STATES; i++) {
        l->scale[i] = 1.0;
    }
    return l;
}

void kent_passages_free(kent_passages *links)
{
    if (!links) return;
    for (size_t i = 0; i < links->count; i++) {
        if (links->link[i].clear) links->link[i].clear(&links->link[i]);
        kent_timetable_clear(&links->link[i].timetable);
    }
    free(links->link);
    free(links);
}

static kent_stand_add *const STANDS[KENT_DEVICE_KINDS] = {
    [KENT_DEVICE_PUMP] = kent_stand_pump,
    [KENT_DEVICE_CHECK_VALVE] = kent_stand_check_valve,
    [KENT_DEVICE_CONTROL_VALVE] = kent_stand_control_valve,
    [KENT_DEVICE_SURGE_TANK] = kent_stand_surge_tank,
    [KENT_DEVICE_ONE_WAY_TANK] = kent_stand_one_way_tank,
    [KENT_DEVICE_AIR_VESSEL] = kent_stand_air_vessel,
    [KENT_DEVICE_RELIEF_VALVE] = kent_stand_relief_valve,
    [KENT_DEVICE_AIR_VALVE] = kent_stand_air_valve,
    [KENT_DEVICE_BURST] = kent_stand_burst,
};

static bool is_left_out(const kent_model *m, int scenario, const kent_device *d)
{
    if (scenario < 0) return false;
    const kent_scenario *s = &m->scenarios[scenario];
    for (size_t i = 0; i < s->without_count; i++) {
        const kent_left_out *w = &m->without[s->without_first + i];
        if (w->kind == d->kind && w->index == d->index) return true;
    }
    return false;
}

static kent_status add_stands(kent_passages *links, const kent_model *m,
                              const kent_steady *s, int scenario, kent_error *err)
{
    kent_status status = KENT_OK;
    for (size_t i = 0; i < m->device_count && !status; i++) {
        const kent_device *d = &m->devices[i];
        kent_stand stand = {m, d, scenario, s->device_flow[i], {0.0, 0.0}};
        if ((d->node[0] < 0 && d->node[1] < 0) || is_left_out(m, scenario, d)) {
            continue;
        }
        for (int side = 0; side < 2; side++) {
            if (d->node[side] >= 0) stand.head[side] = s->node_head[d->node[side]];
        }
        status = STANDS[d->kind](links, &stand, err);
    }
    return status;
}

kent_status kent_passages_new(const kent_model *m, const kent_steady *s, int scenario,
                              kent_passages **out, kent_error *err)
{
    kent_passages *links = kent_alloc(1, sizeof *links);
    if (!links) return kent_error_nomem(err);
    kent_status status = add_levels(links, m, s, scenario, err);
    if (!status) status = add_draws(links, m, s, scenario, err);
    if (!status) status = add_gates(links, m, s, scenario, err);
    if (!status) status = add_stands(links, m, s, scenario, err);
    if (status) {
        kent_passages_free(links);
        return status;
    }
    *out = links;
    return KENT_OK;
}
