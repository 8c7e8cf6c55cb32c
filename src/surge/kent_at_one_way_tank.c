/* A tank behind a check valve: feeds the main while its head is below the tank's level,
 * takes nothing from it. */
#include "kent_throat_internal.h"

#include <math.h>

/* m: a head this much below the level counts as the level. */
static const double SAME_LEVEL = 1e-6;

typedef struct tank {
    double area, bottom; /* m2, m */
    kent_throat throat;
    double step;  /* s */
    double level; /* m, of the instant that was settled last, like ... */
    double flow;  /* m3/s out of the main: nil or negative */
} tank;
_Static_assert(sizeof(tank) <= KENT_DEVICE_STATE, "a tank's state");

static tank *of(kent_device_state *state) { return (tank *)(void *)state->bytes; }
static const tank *as(const kent_device_state *state)
{
    return (const tank *)(const void *)state->bytes;
}

static kent_status start(kent_device_state *state, const kent_model *m, int index,
                         double flow, const double head[2], kent_error *err)
{
    const kent_one_way_tank *o = &m->one_way_tanks[index];
    (void)flow;
    if (head[0] < o->level - SAME_LEVEL) {
        return kent_device_refuse(
            err, m, o->place, o->id,
            "the steady head there, %.2f m, is below its level of "
            "%.2f m: it would drain all the time; a level below "
            "that head would be right",
            head[0], o->level);
    }
    *of(state) = (tank){
        .area = o->area,
        .bottom = o->bottom_level,
        .throat = kent_throat_of(o->connection_diameter, 0.0, o->loss_out, m->gravity),
        .level = o->level};
    return KENT_OK;
}

static void move(kent_device_state *state, const kent_schedule *schedule, double time,
                 double step)
{
    (void)schedule;
    (void)time;
    of(state)->step = step;
}

static double filled(const tank *t, double flow)
{
    return t->level + t->step / (2.0 * t->area) * (t->flow + flow);
}

/* 14.4: the greater of what an open tank asks and no flow; both rise with flow. */
static kent_device_law law(const kent_device_state *state, double flow,
                           const double head[2])
{
    const tank *t = as(state);
    const kent_device_law open = kent_throat_law(&t->throat, flow, filled(t, flow),
                                                 t->step / (2.0 * t->area), head[0]);
    return open.f > flow ? open : (kent_device_law){flow, 1.0, {0.0, 0.0}};
}

static void settle(kent_device_state *state, double flow, const double head[2])
{
    tank *t = of(state);
    (void)head;
    t->level = filled(t, flow);
    t->flow = flow;
}

static void tell(const kent_device_state *state, double told[KENT_TOLD])
{
    told[0] = as(state)->level;
}

static const char *beyond(const kent_device_state *state)
{
    return as(state)->level < as(state)->bottom
               ? "is empty: air would follow its water into the main, which cannot be "
                 "followed; a larger tank would be right"
               : NULL;
}

const kent_device_ops KENT_AT_ONE_WAY_TANK = {
    .quantities = {{"level_m", "level", KENT_LENGTH}},
    .start = start,
    .move = move,
    .law = law,
    .settle = settle,
    .tell = tell,
    .beyond = beyond,
};
