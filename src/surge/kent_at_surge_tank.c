/* An open surge tank: its level rises by what flows in, and spills at its overflow. */
#include "kent_throat_internal.h"

#include <math.h>

typedef struct tank {
    double area, bottom, overflow; /* m2, m, m */
    kent_throat throat;
    double step;  /* s */
    double level; /* m, like the rest of the instant that was settled last */
    double flow;  /* m3/s into it */
    double spilt; /* m3 since t = 0 */
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
    const kent_surge_tank *s = &m->surge_tanks[index];
    const kent_throat throat =
        kent_throat_of(s->connection_diameter, s->loss_in, s->loss_out, m->gravity);
    /* in a steady state that is one nothing flows, and this is the head */
    const double level = head[0] - kent_throat_law(&throat, flow, 0.0, 0.0, 0.0).f;

    if (level > s->overflow_level) {
        return kent_device_refuse(
            err, m, s->place, s->id,
            "its level in the steady state, %.2f m, is above its "
            "overflow_level of %.2f m; a tank that spills all the "
            "time is no surge tank",
            level, s->overflow_level);
    }
    if (level < s->bottom_level) {
        return kent_device_refuse(err, m, s->place, s->id,
                                  "its level in the steady state, %.2f m, is below its "
                                  "bottom_level of %.2f m; it would be empty",
                                  level, s->bottom_level);
    }
    *of(state) = (tank){.area = s->area,
                        .bottom = s->bottom_level,
                        .overflow = s->overflow_level,
                        .throat = throat,
                        .level = level,
                        .flow = flow};
    return KENT_OK;
}

static void move(kent_device_state *state, const kent_schedule *schedule, double time,
                 double step)
{
    (void)schedule;
    (void)time;
    of(state)->step = step;
}

/* m: where the level would be without an overflow. 14.1 */
static double filled(const tank *t, double flow)
{
    return t->level + t->step / (2.0 * t->area) * (t->flow + flow);
}

static kent_device_law law(const kent_device_state *state, double flow,
                           const double head[2])
{
    const tank *t = as(state);
    const double level = filled(t, flow);
    const bool spills = level > t->overflow;
    return kent_throat_law(&t->throat, flow, spills ? t->overflow : level,
                           spills ? 0.0 : t->step / (2.0 * t->area), head[0]);
}

static void settle(kent_device_state *state, double flow, const double head[2])
{
    tank *t = of(state);
    (void)head;
    t->level = filled(t, flow);
    t->flow = flow;
    if (t->level > t->overflow) {
        t->spilt += t->area * (t->level - t->overflow);
        t->level = t->overflow;
    }
}

static void tell(const kent_device_state *state, double told[KENT_TOLD])
{
    told[0] = as(state)->level;
    told[1] = as(state)->spilt;
}

static const char *beyond(const kent_device_state *state)
{
    return as(state)->level < as(state)->bottom
               ? "is empty: below its bottom_level air would enter the main, which "
                 "cannot be followed; a larger or deeper tank would be right"
               : NULL;
}

static const char *caution(const kent_device_state *state)
{
    return as(state)->spilt > 0.0
               ? "overflows; what it spills must have somewhere to go"
               : NULL;
}

const kent_device_ops KENT_AT_SURGE_TANK = {
    .quantities = {{"level_m", "level", KENT_LENGTH},
                   {"spilt_m3", "spilt", KENT_VOLUME}},
    .start = start,
    .move = move,
    .law = law,
    .settle = settle,
    .tell = tell,
    .beyond = beyond,
    .caution = caution,
};
