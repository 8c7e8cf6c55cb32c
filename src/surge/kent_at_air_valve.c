/* An air valve: lets air in below atmospheric pressure, and out again above it, through
 * orifices of their own; shut while there is no air under it.
 *
 * The air stays under the valve, as warm as the water, and water and air are reckoned
 * at the end of each step: nothing rings as the last air leaves. */
#include "kent_device_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
/* m: a steady head this much below the valve is not below it. */
static const double SAME_LEVEL = 1e-6;
/* Share of the pipes beside it that air may fill before it is said that it would
 * spread. Common practice, no source. */
static const double STAYS = 0.1;
/* Pa absolute below which the volume of the air goes on along its tangent. */
static const double LEAST_PRESSURE = 1000.0;

typedef struct valve {
    kent_orifice orifice;
    double release, switched; /* m2, with their coefficient, of what lets air out */
    double switch_pressure;   /* Pa gauge; INFINITY: never */
    double level, weight;     /* m, N/m3 of water */
    double step;              /* s */
    double mass, volume;      /* kg, m3 of air under it, of the instant settled last */
    double pressure;          /* Pa gauge, of that air */
    double room;              /* m3 that it may fill and be thought to stay */
    bool spread;              /* it has filled more */
} valve;
_Static_assert(sizeof(valve) <= KENT_DEVICE_STATE, "an air valve's state");

static valve *of(kent_device_state *state) { return (valve *)(void *)state->bytes; }
static const valve *as(const kent_device_state *state)
{
    return (const valve *)(const void *)state->bytes;
}

static double area(double coefficient, double diameter, int count)
{
    return coefficient * count * 0.25 * PI * diameter * diameter;
}

/* m3 of the pipes that end at a node. */
static double beside(const kent_model *m, int node)
{
    double volume = 0.0;
    const kent_node *at = &m->nodes[node];
    for (size_t i = 0; i < at->end_count; i++) {
        const kent_span *span = &m->spans[m->ends[at->end_first + i].span];
        volume += span->area * span->length;
    }
    return volume;
}

static kent_status start(kent_device_state *state, const kent_model *m, int index,
                         double flow, const double head[2], kent_error *err)
{
    const kent_air_valve *a = &m->air_valves[index];
    const double level = m->points[a->point].at.z;
    const double release =
        area(a->release_coefficient, a->release_orifice, a->in_parallel);
    const bool switches = !isnan(a->switched_orifice);
    (void)flow;

    if (head[0] < level - SAME_LEVEL) {
        return kent_device_refuse(err, m, a->place, a->id,
                                  "the steady head of %.2f m is below it (%.2f m): it "
                                  "would let in air all the time",
                                  head[0], level);
    }
    *of(state) =
        (valve){.orifice = {area(a->admission_coefficient, a->admission_orifice,
                                 a->in_parallel),
                            release, m->barometric, m->water.temperature},
                .release = release,
                .switched = switches ? area(a->release_coefficient, a->switched_orifice,
                                            a->in_parallel)
                                     : release,
                .switch_pressure = switches ? a->switch_pressure : (double)INFINITY,
                .level = level,
                .room = STAYS * beside(m, a->node),
                .weight = m->water.density * m->gravity};
    return KENT_OK;
}

static void move(kent_device_state *state, const kent_schedule *schedule, double time,
                 double step)
{
    (void)schedule;
    (void)time;
    of(state)->step = step;
}

static double pressure_at(const valve *v, double head)
{
    const double p = v->orifice.outside + v->weight * (head - v->level);
    return fmax(p, LEAST_PRESSURE);
}

/* kg at the end of the step, and its derivative with respect to pressure. 14.13 */
static kent_air_rate mass_at(const valve *v, double pressure)
{
    const kent_air_rate rate = kent_air_through(&v->orifice, pressure);
    const double mass = v->mass + v->step * rate.mass;
    if (mass <= 0.0) return (kent_air_rate){0.0, 0.0}; /* all of it has left */
    return (kent_air_rate){mass, v->step * rate.by_pressure};
}

/* 14.14: the air asks for a volume, the water leaves one. */
static kent_device_law law(const kent_device_state *state, double flow,
                           const double head[2])
{
    const valve *v = as(state);
    const double p = pressure_at(v, head[0]);
    const double heat = KENT_AIR_GAS_CONSTANT * v->orifice.temperature; /* J/kg */
    const kent_air_rate air = mass_at(v, p);
    const double by_pressure = heat * (air.by_pressure - air.mass / p) / p;
    const double below =
        v->orifice.outside + v->weight * (head[0] - v->level) - p; /* Pa, never > 0 */
    const double asked = heat * air.mass / p + by_pressure * below;
    return (kent_device_law){(asked - v->volume) / v->step + flow,
                             1.0,
                             {by_pressure * v->weight / v->step, 0.0}};
}

static void settle(kent_device_state *state, double flow, const double head[2])
{
    valve *v = of(state);
    const double p = pressure_at(v, head[0]);
    v->mass = mass_at(v, p).mass;
    v->volume = v->mass > 0.0 ? fmax(v->volume - v->step * flow, 0.0) : 0.0;
    v->pressure = p - v->orifice.outside;
    if (v->volume > v->room) v->spread = true;
    if (v->pressure > v->switch_pressure && v->mass > 0.0) {
        v->orifice.out = v->switched; /* till it has closed, or lets in again */
    } else if (v->pressure < 0.0 || !(v->mass > 0.0)) {
        v->orifice.out = v->release;
    }
}

static void tell(const kent_device_state *state, double told[KENT_TOLD])
{
    told[0] = as(state)->volume;
    told[1] = as(state)->mass > 0.0 ? as(state)->pressure : 0.0;
}

static const char *caution(const kent_device_state *state)
{
    return as(state)->spread
               ? "lets in more air than a tenth of the pipes beside it holds: it would "
                 "spread along them, which is not followed; what comes after is rough"
               : NULL;
}

const kent_device_ops KENT_AT_AIR_VALVE = {
    .quantities = {{"air_volume_m3", "air volume", KENT_VOLUME},
                   {"air_pressure_Pa", "air pressure", KENT_PRESSURE}},
    .start = start,
    .move = move,
    .law = law,
    .settle = settle,
    .tell = tell,
    .caution = caution,
};
