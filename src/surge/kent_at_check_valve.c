/* A check valve in line, ideal or delayed. */
#include "kent_device_internal.h"
#include "kent_flap_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

typedef struct check {
    kent_flap flap;
    double loss; /* s2/m5: K/(2 g A2) */
    double area; /* m2, of its size */
    double z;    /* s/m2: impedance of a rigid pipe of its size */
    double flow; /* m3/s, at the instant that was settled last */
    double time, step;
} check;
_Static_assert(sizeof(check) <= KENT_DEVICE_STATE, "a check valve's state");

static check *of(kent_device_state *state) { return (check *)(void *)state->bytes; }
static const check *as(const kent_device_state *state)
{
    return (const check *)(const void *)state->bytes;
}

static kent_status start(kent_device_state *state, const kent_model *m, int index,
                         double flow, const double head[2], kent_error *err)
{
    const kent_check_valve *v = &m->check_valves[index];
    const double area = 0.25 * PI * v->size * v->size;
    const kent_check_kind kind = v->delay > 0.0 ? KENT_CHECK_DELAYED : KENT_CHECK_IDEAL;
    (void)head;
    (void)err;
    *of(state) = (check){.flap = kent_flap_new(kind, v->delay, flow),
                         .loss = v->loss / (2.0 * m->gravity * area * area),
                         .area = area,
                         .z = 1000.0 / (m->gravity * area), /* at 1000 m/s */
                         .flow = flow};
    return KENT_OK;
}

static void move(kent_device_state *state, const kent_schedule *schedule, double time,
                 double step)
{
    check *c = of(state);
    (void)schedule;
    c->time = time;
    c->step = step;
    (void)kent_flap_move(&c->flap, time, c->flow);
}

/* 13.15, what the head before it has to spare: negative where it pushes it open */
static kent_flap_gap gap(const check *c, double q, const double head[2])
{
    const bool one_way = kent_flap_is_one_way(&c->flap);
    const double at = one_way ? fmax(q, 0.0) : q;
    const double value = head[1] - head[0] + c->loss * at * fabs(at);
    const double slope = 2.0 * c->loss * fabs(at);
    if (!one_way) return (kent_flap_gap){value, slope, false};
    return kent_flap_law(q, value, slope, c->z);
}

static kent_device_law law(const kent_device_state *state, double flow,
                           const double head[2])
{
    const kent_flap_gap g = gap(as(state), flow, head);
    const double by_head = g.shut ? 0.0 : 1.0;
    return (kent_device_law){g.value, g.slope, {-by_head, by_head}};
}

static void settle(kent_device_state *state, double flow, const double head[2])
{
    check *c = of(state);
    const double now = gap(c, flow, head).shut ? 0.0 : flow;
    kent_flap_settle(&c->flap, c->flow, now, c->time, c->step);
    c->flow = now;
}

static void tell(const kent_device_state *state, double told[KENT_TOLD])
{
    told[0] = as(state)->flap.stopped / as(state)->area;
}

const kent_device_ops KENT_AT_CHECK_VALVE = {
    .quantities = {{"slam_velocity_ms", "reverse velocity on closing", KENT_SPEED}},
    .start = start,
    .move = move,
    .law = law,
    .settle = settle,
    .tell = tell,
};
