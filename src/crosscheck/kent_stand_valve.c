/* Valves that move by themselves, and bursts: what lets water through one way. */
#include "kent_passage_internal.h"

#include <math.h>

/* m: a control valve moves at full speed where the head is off by more, else slower in
 * proportion. */
static const double BAND = 0.05;
/* s: whole stroke of a valve that moves at once. */
static const double AT_ONCE = 2e-3;
/* Share of the stroke over which a valve slows down before its stops. */
static const double CUSHION = 0.01;
/* s: a relief valve follows what the pressure asks this closely. */
static const double FOLLOWS = 1e-3;
static const double OPEN = 0.999;

/* ---- strokes --------------------------------------------------------------------- */

/* A speed held within limits and slowed down before the stops; by what it depends on.
 */
typedef struct stroke {
    double speed, by_wish, by_opening; /* 1/s, -, 1/s */
} stroke;

/* wish, times per: 1/s that it would move, positive opens. */
static stroke move_within(double wish, double opening, double opening_time,
                          double closure_time)
{
    const double up = 1.0 / fmax(opening_time, AT_ONCE);
    const double down = 1.0 / fmax(closure_time, AT_ONCE);
    stroke s = {wish, 1.0, 0.0};
    if (s.speed > up) s = (stroke){up, 0.0, 0.0};
    if (s.speed < -down) s = (stroke){-down, 0.0, 0.0};
    const double most = up * (1.0 - opening) / CUSHION;
    const double least = -down * opening / CUSHION;
    if (s.speed > most) s = (stroke){most, 0.0, -up / CUSHION};
    if (s.speed < least) s = (stroke){least, 0.0, -down / CUSHION};
    return s;
}

/* ---- control valves -------------------------------------------------------------- */

/* 17.19 */
static void control_law(const kent_passage *l, double time, const double *u,
                        kent_law *law)
{
    const kent_control_passage *c = &l->is.control;
    const double x = u[KENT_AT_STATE];
    const kent_opening o =
        kent_passage_one_way(c->capacity * fmax(x, 0.0), c->conductance,
                             u[KENT_AT_FLOW], u[KENT_AT_HEAD] - u[KENT_AT_HEAD_BEYOND]);
    const bool reduces = c->holds == KENT_HOLDS_DOWNSTREAM;
    const double off =
        reduces ? c->set - u[KENT_AT_HEAD_BEYOND] : u[KENT_AT_HEAD] - c->set;
    const double full =
        1.0 / fmax(off > 0.0 ? c->opening_time : c->closure_time, AT_ONCE);
    const stroke s =
        move_within(full * off / BAND, x, c->opening_time, c->closure_time);
    (void)time;
    law->f = o.f;
    law->by[KENT_AT_FLOW] = o.by_flow;
    law->by[KENT_AT_HEAD] = o.by_drop;
    law->by[KENT_AT_HEAD_BEYOND] = -o.by_drop;
    law->by[KENT_AT_STATE] = x > 0.0 ? o.by_e * c->capacity : 0.0;
    law->rate[0] = s.speed;
    law->rate_by[0][KENT_AT_STATE] = s.by_opening;
    if (reduces) {
        law->rate_by[0][KENT_AT_HEAD_BEYOND] = -s.by_wish * full / BAND;
    } else {
        law->rate_by[0][KENT_AT_HEAD] = s.by_wish * full / BAND;
    }
}

static const kent_passage_ops CONTROL = {.states = 1, .law = control_law};

/* 0 .. 1, by what it passed; where nothing flows open unless `shut`. */
static double opening_of(double capacity, double flow, double drop, bool shut)
{
    if (flow > 0.0 && drop > 0.0) return fmin(flow / (capacity * sqrt(drop)), 1.0);
    return shut ? 0.0 : 1.0;
}

static double head_of(const kent_model *m, int point, double pressure)
{
    return m->points[point].at.z + pressure / (m->water.density * m->gravity);
}

kent_status kent_stand_control_valve(kent_passages *links, const kent_stand *stand,
                                     kent_error *err)
{
    const kent_model *m = stand->model;
    const kent_control_valve *v = &m->control_valves[stand->device->index];
    const double set = head_of(m, v->point, v->set_pressure);
    const bool too_much =
        v->holds == KENT_HOLDS_DOWNSTREAM ? stand->head[1] > set : stand->head[0] < set;
    kent_passage *l = kent_passages_add(links, &CONTROL, v->id, v->node);
    if (!l) return kent_error_nomem(err);
    l->is.control =
        (kent_control_passage){v->holds,        set,
                               v->capacity,     v->opening_time,
                               v->closure_time, kent_passage_conductance(m, v->node)};
    l->start[0] = stand->flow;
    l->start[1] =
        opening_of(v->capacity, stand->flow, stand->head[0] - stand->head[1], too_much);
    l->scale[1] = 0.01;
    return KENT_OK;
}

/* ---- relief valves --------------------------------------------------------------- */

static double relief_asked(const kent_relief_passage *r, double head)
{
    if (r->forced) return 1.0;
    return fmin(fmax((head - r->set) / (r->full - r->set), 0.0), 1.0);
}

/* Whether it is open as far as the head asks, whatever its state. */
static bool relief_leads(const kent_passage *l, const double *u)
{
    const kent_relief_passage *r = &l->is.relief;
    return l->settling && !(r->opening_time > 0.0) &&
           relief_asked(r, u[KENT_AT_HEAD]) > u[KENT_AT_STATE];
}

/* 17.20 */
static void relief_law(const kent_passage *l, double time, const double *u,
                       kent_law *law)
{
    const kent_relief_passage *r = &l->is.relief;
    const double x = u[KENT_AT_STATE], head = u[KENT_AT_HEAD];
    const double asked = (head - r->set) / (r->full - r->set);
    const bool within = !r->forced && asked > 0.0 && asked < 1.0;
    const double target = relief_asked(r, head);
    const bool leads = relief_leads(l, u);
    const double open = leads ? target : fmax(x, 0.0);
    const kent_opening o = kent_passage_one_way(r->capacity * open, r->conductance,
                                                u[KENT_AT_FLOW], head - r->level);
    const stroke s =
        move_within((target - x) / FOLLOWS, x, r->opening_time, r->closure_time);
    const double by_open = open > 0.0 ? o.by_e * r->capacity : 0.0;
    (void)time;
    law->f = o.f;
    law->by[KENT_AT_FLOW] = o.by_flow;
    law->by[KENT_AT_HEAD] = o.by_drop;
    law->by[KENT_AT_STATE] = leads ? 0.0 : by_open;
    if (leads && within) law->by[KENT_AT_HEAD] += by_open / (r->full - r->set);
    law->rate[0] = s.speed;
    law->rate_by[0][KENT_AT_STATE] = s.by_opening - s.by_wish / FOLLOWS;
    if (within) {
        law->rate_by[0][KENT_AT_HEAD] = s.by_wish / (FOLLOWS * (r->full - r->set));
    }
}

static void relief_settle(const kent_passage *l, double *u)
{
    if (relief_leads(l, u)) {
        u[KENT_AT_STATE] = relief_asked(&l->is.relief, u[KENT_AT_HEAD]);
    }
}

static void relief_watch(const kent_passage *l, double time, const double *u,
                         double *root)
{
    const kent_relief_passage *r = &l->is.relief;
    (void)time;
    root[0] = isinf(r->low) ? 1.0 : u[KENT_AT_HEAD] - r->low;
    root[1] = r->forced && isinf(l->alarm) ? u[KENT_AT_STATE] - OPEN : 1.0;
}

static void relief_cross(kent_passage *l, double time, double *u, size_t root,
                         bool rising)
{
    kent_relief_passage *r = &l->is.relief;
    (void)u;
    if (root == 1) { /* it is open: now it holds */
        l->alarm = time + r->hold_time;
    } else if (rising) {
        r->armed = true;
    } else if (r->armed && !r->forced) {
        r->armed = false;
        r->forced = true;
    }
}

static void relief_due(kent_passage *l, double time, double *u)
{
    (void)time;
    (void)u;
    l->is.relief.forced = false;
}

static const kent_passage_ops RELIEF = {
    .states = 1,
    .roots = 2,
    .law = relief_law,
    .watch = relief_watch,
    .cross = relief_cross,
    .due = relief_due,
    .settle = relief_settle,
};

kent_status kent_stand_relief_valve(kent_passages *links, const kent_stand *stand,
                                    kent_error *err)
{
    const kent_model *m = stand->model;
    const kent_relief_valve *v = &m->relief_valves[stand->device->index];
    const int node[2] = {v->node, -1};
    const double level =
        isnan(v->discharge_level) ? m->points[v->point].at.z : v->discharge_level;
    kent_passage *l = kent_passages_add(links, &RELIEF, v->id, node);
    if (!l) return kent_error_nomem(err);
    l->is.relief = (kent_relief_passage){
        .set = head_of(m, v->point, v->set_pressure),
        .full = head_of(m, v->point, v->full_open_pressure),
        .low = isnan(v->low_set_pressure) ? -(double)INFINITY
                                          : head_of(m, v->point, v->low_set_pressure),
        .level = level,
        .capacity = v->capacity,
        .opening_time = v->opening_time,
        .closure_time = v->closure_time,
        .hold_time = v->hold_time,
        .conductance = kent_passage_conductance(m, node),
        .armed = true,
    };
    l->start[0] = stand->flow;
    l->start[1] = opening_of(v->capacity, stand->flow, stand->head[0] - level, true);
    l->scale[1] = 0.01;
    return KENT_OK;
}

/* ---- bursts ---------------------------------------------------------------------- */

/* Of the event that began last. */
static double coefficient_at(const kent_hole_passage *h, double time)
{
    double began = -INFINITY, coefficient = 0.0;
    for (size_t i = 0; i < h->event_count; i++) {
        const kent_event *e = &h->event[i];
        if (e->kind != KENT_EVENT_BURST || e->target != h->index) continue;
        if (e->start_time > time || e->start_time < began) continue;
        began = e->start_time;
        coefficient = e->coefficient;
    }
    return coefficient;
}

/* 17.12 with E = C A sqrt(2 g), out only */
static void hole_law(const kent_passage *l, double time, const double *u, kent_law *law)
{
    const kent_hole_passage *h = &l->is.hole;
    const double e = coefficient_at(h, time) * h->root_2g *
                     kent_timetable_value(&l->timetable, time);
    const kent_opening o = kent_passage_one_way(e, h->conductance, u[KENT_AT_FLOW],
                                                u[KENT_AT_HEAD] - h->level);
    law->f = o.f;
    law->by[KENT_AT_FLOW] = o.by_flow;
    law->by[KENT_AT_HEAD] = o.by_drop;
}

static const kent_passage_ops HOLE = {.law = hole_law};

kent_status kent_stand_burst(kent_passages *links, const kent_stand *stand,
                             kent_error *err)
{
    const kent_model *m = stand->model;
    const kent_burst *b = &m->bursts[stand->device->index];
    const int node[2] = {b->node, -1};
    kent_passage *l = kent_passages_add(links, &HOLE, m->points[b->point].id, node);
    if (!l) return kent_error_nomem(err);
    l->is.hole = (kent_hole_passage){.index = stand->device->index,
                                     .level = m->points[b->point].at.z,
                                     .root_2g = sqrt(2.0 * m->gravity),
                                     .conductance = kent_passage_conductance(m, node)};
    if (stand->scenario >= 0) {
        const kent_scenario *s = &m->scenarios[stand->scenario];
        l->is.hole.event = m->events + s->event_first;
        l->is.hole.event_count = s->event_count;
    }
    return kent_timetable_fill(&l->timetable, m, stand->scenario, KENT_EVENT_BURST,
                               stand->device->index, 0.0, err);
}
