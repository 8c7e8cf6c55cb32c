/* An air vessel: a closed gas over water, which gives and takes. */
#include "kent_throat_internal.h"

#include <math.h>

typedef struct vessel {
    kent_gas gas;           /* of the steady state */
    double barometric;      /* Pa absolute */
    double weight;          /* N/m3 of water */
    double level_per_cubic; /* 1/m2: 1/area in plan */
    double first_level;     /* m, of the water in the steady state */
    double total;           /* m3 */
    kent_throat throat;
    double step;   /* s */
    double volume; /* m3 of gas, of the instant that was settled last, like ... */
    double flow;   /* m3/s into it */
} vessel;
_Static_assert(sizeof(vessel) <= KENT_DEVICE_STATE, "a vessel's state");

static vessel *of(kent_device_state *state) { return (vessel *)(void *)state->bytes; }
static const vessel *as(const kent_device_state *state)
{
    return (const vessel *)(const void *)state->bytes;
}

static kent_status start(kent_device_state *state, const kent_model *m, int index,
                         double flow, const double head[2], kent_error *err)
{
    const kent_air_vessel *a = &m->air_vessels[index];
    const double level =
        isnan(a->water_level) ? m->points[a->point].at.z : a->water_level;
    const double weight = m->water.density * m->gravity;
    const kent_throat throat =
        kent_throat_of(a->connection_diameter, a->loss_in, a->loss_out, m->gravity);
    const double own = head[0] - kent_throat_law(&throat, flow, 0.0, 0.0, 0.0).f;
    const double pressure = m->barometric + weight * (own - level);

    if (!(a->gas_volume < a->total_volume)) {
        return kent_device_refuse(err, m, a->place, a->id,
                                  "gas_volume is not less than total_volume; no water "
                                  "would be left in it");
    }
    if (!(pressure > m->water.vapour_pressure)) {
        return kent_device_refuse(
            err, m, a->place, a->id,
            "its water_level of %.2f m is so far above the steady "
            "head of %.2f m that no gas can be over it",
            level, own);
    }
    *of(state) = (vessel){.gas = {pressure, a->gas_volume, a->polytropic_exponent},
                          .barometric = m->barometric,
                          .weight = weight,
                          .level_per_cubic = isinf(a->area) ? 0.0 : 1.0 / a->area,
                          .first_level = level,
                          .total = a->total_volume,
                          .throat = throat,
                          .volume = a->gas_volume,
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

/* m3: 14.6 */
static double left(const vessel *v, double flow)
{
    return v->volume - 0.5 * v->step * (v->flow + flow);
}

static double water_level(const vessel *v, double volume)
{
    return v->first_level + (v->gas.volume - volume) * v->level_per_cubic;
}

/* 14.7 */
static kent_device_law law(const kent_device_state *state, double flow,
                           const double head[2])
{
    const vessel *v = as(state);
    const double volume = left(v, flow);
    const kent_gas_point gas = kent_gas_in(&v->gas, volume);
    const double own =
        water_level(v, volume) + (gas.pressure - v->barometric) / v->weight;
    const double by_volume = gas.by_volume / v->weight - v->level_per_cubic;
    return kent_throat_law(&v->throat, flow, own, -0.5 * v->step * by_volume, head[0]);
}

static void settle(kent_device_state *state, double flow, const double head[2])
{
    vessel *v = of(state);
    (void)head;
    v->volume = left(v, flow);
    v->flow = flow;
}

static void tell(const kent_device_state *state, double told[KENT_TOLD])
{
    const vessel *v = as(state);
    told[0] = v->volume;
    told[1] = kent_gas_in(&v->gas, v->volume).pressure - v->barometric;
    told[2] = water_level(v, v->volume);
}

static const char *beyond(const kent_device_state *state)
{
    const vessel *v = as(state);
    if (v->volume >= v->total) {
        return "is empty of water: its gas would escape into the main, which cannot be "
               "followed; a larger total_volume, or less gas, would be right";
    }
    if (v->volume <= KENT_GAS_LEAST * v->gas.volume) {
        return "is full of water: its gas is pressed into less than a thousandth of "
               "its "
               "volume; more gas would be right";
    }
    return NULL;
}

const kent_device_ops KENT_AT_AIR_VESSEL = {
    .quantities = {{"gas_volume_m3", "gas volume", KENT_VOLUME},
                   {"gas_pressure_Pa", "gas pressure", KENT_PRESSURE},
                   {"water_level_m", "water level", KENT_LENGTH}},
    .start = start,
    .move = move,
    .law = law,
    .settle = settle,
    .tell = tell,
    .beyond = beyond,
};
