/* Pumps, by groups of units that fare alike, and check valves. */
#include "kent_passage_internal.h"

#include <math.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;
/* m: a check valve that has shut opens again for more than this. */
static const double OPENS_FOR = 1e-3;

/* ---- check valves ---------------------------------------------------------------- */

kent_gate_flap kent_gate_flap_new(kent_check_kind kind, double delay, double flow)
{
    const bool at_once = kind == KENT_CHECK_DELAYED && !(delay > 0.0);
    return (kent_gate_flap){.kind = at_once ? KENT_CHECK_IDEAL : kind,
                            .delay = delay,
                            .shuts_at = INFINITY,
                            .opened = -INFINITY,
                            .shut = kind != KENT_CHECK_NONE && !(flow > 0.0)};
}

void kent_gate_flap_watch(const kent_gate_flap *f, double flow, double gap,
                          double *root)
{
    const bool has = f->kind != KENT_CHECK_NONE;
    root[0] = has && !f->shut ? flow : 1.0;
    root[1] = has && f->shut ? gap - OPENS_FOR : 1.0;
}

/* 17.18 */
void kent_gate_flap_cross(kent_gate_flap *f, double time, size_t root, bool rising)
{
    if (root == 1) {
        if (!rising) return;
        f->shut = false;
        f->opened = time;
    } else if (rising) {
        f->shuts_at = INFINITY; /* it flows forward again */
    } else if (f->kind == KENT_CHECK_IDEAL || time - f->opened < f->delay) {
        f->shut = true;
    } else {
        f->shuts_at = time + f->delay;
    }
}

static bool flap_due(kent_gate_flap *f, double time)
{
    if (!(f->shuts_at <= time)) return false;
    f->shut = true;
    f->shuts_at = INFINITY;
    return true;
}

static void flap_law(const kent_passage *l, double time, const double *u, kent_law *law)
{
    const kent_flap_passage *c = &l->is.flap;
    (void)time;
    if (c->flap.shut) {
        law->f = u[KENT_AT_FLOW];
        law->by[KENT_AT_FLOW] = 1.0;
        return;
    }
    law->f = kent_passage_loss(c->loss, u[KENT_AT_FLOW], &law->by[KENT_AT_FLOW]) -
             (u[KENT_AT_HEAD] - u[KENT_AT_HEAD_BEYOND]);
    law->by[KENT_AT_HEAD] = -1.0;
    law->by[KENT_AT_HEAD_BEYOND] = 1.0;
}

static void flap_watch(const kent_passage *l, double time, const double *u,
                       double *root)
{
    (void)time;
    kent_gate_flap_watch(&l->is.flap.flap, u[KENT_AT_FLOW],
                         u[KENT_AT_HEAD] - u[KENT_AT_HEAD_BEYOND], root);
}

static void flap_cross(kent_passage *l, double time, double *u, size_t root,
                       bool rising)
{
    (void)u;
    kent_gate_flap_cross(&l->is.flap.flap, time, root, rising);
    l->alarm = l->is.flap.flap.shuts_at;
}

static void flap_shuts(kent_passage *l, double time, double *u)
{
    (void)u;
    (void)flap_due(&l->is.flap.flap, time);
}

static const kent_passage_ops FLAP = {
    .roots = 2,
    .law = flap_law,
    .watch = flap_watch,
    .cross = flap_cross,
    .due = flap_shuts,
};

kent_status kent_stand_check_valve(kent_passages *links, const kent_stand *stand,
                                   kent_error *err)
{
    const kent_check_valve *v = &stand->model->check_valves[stand->device->index];
    const double area = 0.25 * PI * v->size * v->size;
    kent_passage *l = kent_passages_add(links, &FLAP, v->id, v->node);
    if (!l) return kent_error_nomem(err);
    l->is.flap.loss = v->loss / (2.0 * stand->model->gravity * area * area);
    l->is.flap.flap = kent_gate_flap_new(KENT_CHECK_DELAYED, v->delay, stand->flow);
    l->start[0] = stand->flow;
    return KENT_OK;
}

/* ---- pumps ----------------------------------------------------------------------- */

/* m, less what the check valve loses; head beyond less head before must be that. */
static double lift(const kent_unit_passage *p, const double *u, kent_law *law)
{
    const double q = u[KENT_AT_FLOW] / p->units;
    const kent_pump_point at = kent_pump_at(&p->pump->curve, q, u[KENT_AT_STATE]);
    double by_flow = 0.0;
    const double loss = kent_passage_loss(p->pump->check_loss, q, &by_flow);
    law->by[KENT_AT_FLOW] = (at.head_by_flow - by_flow) / p->units;
    law->by[KENT_AT_STATE] = at.head_by_speed;
    return at.head - loss;
}

static double suction(const kent_passage *l, const double *u)
{
    return l->node[0] < 0 ? l->is.unit.pump->suction_level : u[KENT_AT_HEAD];
}

/* 17.16, 17.17 */
static void unit_law(const kent_passage *l, double time, const double *u, kent_law *law)
{
    const kent_unit_passage *p = &l->is.unit;
    (void)time;
    if (p->flap.shut || p->standing) {
        law->f = u[KENT_AT_FLOW];
        law->by[KENT_AT_FLOW] = 1.0;
    } else {
        law->f = lift(p, u, law) + suction(l, u) - u[KENT_AT_HEAD_BEYOND];
        law->by[KENT_AT_HEAD] = l->node[0] < 0 ? 0.0 : 1.0;
        law->by[KENT_AT_HEAD_BEYOND] = -1.0;
    }
    law->rate[0] = p->slope;
    if (!p->free) return;
    const kent_pump_point at =
        kent_pump_at(&p->pump->curve, u[KENT_AT_FLOW] / p->units, u[KENT_AT_STATE]);
    law->rate[0] = -at.torque / p->pump->inertia;
    law->rate_by[0][KENT_AT_FLOW] = -at.torque_by_flow / (p->pump->inertia * p->units);
    law->rate_by[0][KENT_AT_STATE] = -at.torque_by_speed / p->pump->inertia;
}

static void unit_watch(const kent_passage *l, double time, const double *u,
                       double *root)
{
    const kent_unit_passage *p = &l->is.unit;
    double none[KENT_PASSAGE_UNKNOWNS];
    kent_law law = {0};
    (void)time;
    for (size_t i = 0; i < KENT_PASSAGE_UNKNOWNS; i++) {
        none[i] = i == KENT_AT_FLOW ? 0.0 : u[i];
    }
    const double gap = lift(p, none, &law) + suction(l, u) - u[KENT_AT_HEAD_BEYOND];
    kent_gate_flap_watch(&p->flap, u[KENT_AT_FLOW], gap, root);
    if (p->standing) root[0] = root[1] = 1.0;
}

static double next_event(const kent_unit_passage *p)
{
    return p->begun < p->event_count ? p->event[p->begun]->start_time : INFINITY;
}

static void set_alarm(kent_passage *l)
{
    const kent_unit_passage *p = &l->is.unit;
    l->alarm = fmin(fmin(next_event(p), p->ramp_end), p->flap.shuts_at);
}

static void unit_cross(kent_passage *l, double time, double *u, size_t root,
                       bool rising)
{
    (void)u;
    kent_gate_flap_cross(&l->is.unit.flap, time, root, rising);
    set_alarm(l);
}

static void begin(kent_unit_passage *p, const kent_event *e, double time, double *speed)
{
    const double rated = p->pump->curve.rated_speed;
    p->standing = false;
    p->slope = 0.0;
    p->ramp_end = INFINITY;
    p->free = e->action == KENT_TRIP;
    switch (e->action) {
    case KENT_TRIP:
        return;
    case KENT_START:
        p->to = rated;
        break;
    case KENT_STOP:
        p->to = 0.0;
        break;
    case KENT_RAMP:
        p->to = e->to * rated;
        break;
    }
    if (!(e->ramp_time > 0.0)) {
        *speed = p->to;
        return;
    }
    p->slope = (p->to - *speed) / e->ramp_time;
    p->ramp_end = time + e->ramp_time;
}

static void unit_due(kent_passage *l, double time, double *u)
{
    kent_unit_passage *p = &l->is.unit;
    if (p->ramp_end <= time) {
        u[KENT_AT_STATE] = p->to;
        p->slope = 0.0;
        p->ramp_end = INFINITY;
    }
    while (next_event(p) <= time) {
        begin(p, p->event[p->begun++], time, &u[KENT_AT_STATE]);
    }
    (void)flap_due(&p->flap, time);
    set_alarm(l);
}

static void unit_clear(kent_passage *l) { free((void *)l->is.unit.event); }

static const kent_passage_ops UNIT = {
    .states = 1,
    .roots = 2,
    .law = unit_law,
    .watch = unit_watch,
    .cross = unit_cross,
    .due = unit_due,
};

/* Whether an event of that action is for a unit that has power, or for one without. */
static bool concerns(kent_action action, bool powered)
{
    return action == KENT_START ? !powered : powered;
}

static bool powered_after(const kent_event *e)
{
    return e->action == KENT_START || (e->action == KENT_RAMP && e->to > 0.0);
}

/* What happens to each unit of a pump. */
typedef struct fates {
    const kent_pump *pump;
    size_t most;              /* events of one unit */
    const kent_event **event; /* [in_parallel][most] by start */
    size_t *count;            /* [in_parallel] */
    bool *powered;            /* [in_parallel] now */
} fates;

static void fates_clear(fates *f)
{
    free((void *)f->event);
    free(f->count);
    free(f->powered);
}

/* Gives one event to as many units as it asks for, in order. */
static void hand_out(fates *f, const kent_event *e)
{
    int left = e->how_many == 0 ? f->pump->in_parallel : e->how_many;
    for (int i = 0; i < f->pump->in_parallel && left > 0; i++) {
        if (!concerns(e->action, f->powered[i])) continue;
        f->event[(size_t)i * f->most + f->count[i]++] = e;
        f->powered[i] = powered_after(e);
        left--;
    }
}

/* Events by start, equal ones as listed. */
static void hand_out_all(fates *f, const kent_stand *stand)
{
    const kent_model *m = stand->model;
    const kent_scenario *s = &m->scenarios[stand->scenario];
    double after = -INFINITY;
    for (;;) {
        double next = INFINITY;
        for (size_t i = 0; i < s->event_count; i++) {
            const double start = m->events[s->event_first + i].start_time;
            if (start > after) next = fmin(next, start);
        }
        if (isinf(next)) return;
        for (size_t i = 0; i < s->event_count; i++) {
            const kent_event *e = &m->events[s->event_first + i];
            if (e->start_time != next || e->kind != KENT_EVENT_PUMP ||
                e->target != stand->device->index) {
                continue;
            }
            hand_out(f, e);
        }
        after = next;
    }
}

static bool are_alike(const fates *f, int a, int b)
{
    const size_t n = f->count[a];
    if ((a < f->pump->running) != (b < f->pump->running) || n != f->count[b]) {
        return false;
    }
    for (size_t i = 0; i < n; i++) {
        if (f->event[(size_t)a * f->most + i] != f->event[(size_t)b * f->most + i]) {
            return false;
        }
    }
    return true;
}

/* Units that fare alike are one passage: apart, they could not tell who passes what
 * where the curve is flat. */
static kent_status add_units(kent_passages *links, const kent_stand *stand,
                             const fates *f, int first, int units, kent_error *err)
{
    const kent_pump *p = f->pump;
    const bool runs = first < p->running;
    const double flow = runs ? stand->flow / p->running : 0.0;
    kent_passage *l = kent_passages_add(links, &UNIT, p->id, p->node);
    if (!l) return kent_error_nomem(err);
    l->clear = unit_clear;
    l->is.unit = (kent_unit_passage){
        .pump = p,
        .units = units,
        .event = kent_alloc(f->most, sizeof(const kent_event *)),
        .event_count = f->count[first],
        .ramp_end = INFINITY,
        .standing = !runs && p->check_valve != KENT_CHECK_NONE,
        .flap = kent_gate_flap_new(p->check_valve, p->check_delay, flow),
    };
    if (!l->is.unit.event) return kent_error_nomem(err);
    for (size_t i = 0; i < f->count[first]; i++) {
        l->is.unit.event[i] = f->event[(size_t)first * f->most + i];
    }
    l->start[0] = flow * units;
    l->start[1] = runs ? p->curve.rated_speed : 0.0;
    l->scale[1] = p->curve.rated_speed / p->curve.rated_head;
    set_alarm(l);
    return KENT_OK;
}

static kent_status add_groups(kent_passages *links, const kent_stand *stand,
                              const fates *f, kent_error *err)
{
    kent_status status = KENT_OK;
    for (int i = 0; i < f->pump->in_parallel && !status; i++) {
        int units = 0;
        bool met = false; /* alike with one before */
        for (int k = 0; k < f->pump->in_parallel; k++) {
            if (!are_alike(f, i, k)) continue;
            met |= k < i;
            units++;
        }
        if (!met) status = add_units(links, stand, f, i, units, err);
    }
    return status;
}

kent_status kent_stand_pump(kent_passages *links, const kent_stand *stand,
                            kent_error *err)
{
    const kent_model *m = stand->model;
    const kent_pump *p = &m->pumps[stand->device->index];
    const size_t units = (size_t)p->in_parallel;
    const size_t most =
        stand->scenario < 0 ? 0 : m->scenarios[stand->scenario].event_count;
    fates f = {.pump = p,
               .most = most,
               .event = kent_alloc(units * most, sizeof(const kent_event *)),
               .count = kent_alloc(units, sizeof *f.count),
               .powered = kent_alloc(units, sizeof *f.powered)};
    kent_status status = KENT_E_NOMEM;
    if (f.event && f.count && f.powered) {
        for (int i = 0; i < p->running; i++) {
            f.powered[i] = true;
        }
        if (most > 0) hand_out_all(&f, stand);
        status = add_groups(links, stand, &f, err);
    }
    fates_clear(&f);
    return status == KENT_E_NOMEM ? kent_error_nomem(err) : status;
}
