/* A valve that holds a pressure: at most that much behind it (reducing), or at least
 * that much before it (sustaining); it lets nothing back. */
#include "kent_stroke_internal.h"

#include <math.h>

typedef struct control {
    kent_holds holds;
    double set;      /* m: head that it holds */
    double capacity; /* m^2.5/s when open */
    double opening_time, closure_time;
    kent_stroke stroke; /* of this step */
    double opening;     /* 0 .. 1, of the instant that was settled last */
} control;
_Static_assert(sizeof(control) <= KENT_DEVICE_STATE, "a control valve's state");

static control *of(kent_device_state *state) { return (control *)(void *)state->bytes; }
static const control *as(const kent_device_state *state)
{
    return (const control *)(const void *)state->bytes;
}

/* Positive where it should close. 14.10 */
static kent_device_law wish(const control *c, const double head[2])
{
    if (c->holds == KENT_HOLDS_DOWNSTREAM) {
        return (kent_device_law){head[1] - c->set, 0.0, {0.0, 1.0}};
    }
    return (kent_device_law){c->set - head[0], 0.0, {-1.0, 0.0}};
}

static kent_status start(kent_device_state *state, const kent_model *m, int index,
                         double flow, const double head[2], kent_error *err)
{
    const kent_control_valve *v = &m->control_valves[index];
    const kent_stroke whole = {0.0, 1.0};
    control *c = of(state);
    *c = (control){.holds = v->holds,
                   .set = m->points[v->point].at.z +
                          v->set_pressure / (m->water.density * m->gravity),
                   .capacity = v->capacity,
                   .opening_time = v->opening_time,
                   .closure_time = v->closure_time};
    if (flow < 0.0) {
        /* unreached: the steady state lets nothing back either */
        return kent_device_refuse(err, m, v->place, v->id,
                                  "%.4g m3/s flow back through it in the steady state",
                                  -flow);
    }
    c->opening = kent_stroke_opening(&whole, c->capacity, flow, head, wish(c, head).f);
    return KENT_OK;
}

static void move(kent_device_state *state, const kent_schedule *schedule, double time,
                 double step)
{
    control *c = of(state);
    (void)schedule;
    (void)time;
    c->stroke = kent_stroke_from(c->opening, step, c->opening_time, c->closure_time);
}

static kent_device_law law(const kent_device_state *state, double flow,
                           const double head[2])
{
    const control *c = as(state);
    const kent_device_law w = wish(c, head);
    return kent_stroke_law(flow, head, c->stroke.least * c->capacity,
                           c->stroke.most * c->capacity, &w);
}

static void settle(kent_device_state *state, double flow, const double head[2])
{
    control *c = of(state);
    c->opening =
        kent_stroke_opening(&c->stroke, c->capacity, flow, head, wish(c, head).f);
}

static void tell(const kent_device_state *state, double told[KENT_TOLD])
{
    told[0] = as(state)->opening;
}

const kent_device_ops KENT_AT_CONTROL_VALVE = {
    .quantities = {{"opening", "opening", KENT_RATIO}},
    .start = start,
    .move = move,
    .law = law,
    .settle = settle,
    .tell = tell,
};
