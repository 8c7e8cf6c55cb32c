/* A relief valve: opens as the pressure rises past what it is set to; one that
 * anticipates opens as it falls, too, before the surge comes back. */
#include "kent_stroke_internal.h"

#include <math.h>

typedef enum phase {
    BY_PRESSURE,
    OPENS, /* having seen the fall */
    HOLDS
} phase;

typedef struct relief {
    double set, full; /* m: heads at which it begins to open, and is open */
    double low;       /* m: a fall below it opens it; -INFINITY: none does */
    double level;     /* m, where it discharges */
    double capacity;  /* m^2.5/s when open */
    double opening_time, closure_time, hold_time; /* s */
    double time, step;                            /* s, of this step */
    kent_stroke stroke;                           /* of this step */
    double opening;                               /* 0 .. 1, settled last, like ... */
    double flow;                                  /* m3/s */
    double discharged;                            /* m3 since t = 0 */
    phase phase;
    bool armed;        /* the head has been above low since it last opened for it */
    double held_until; /* s */
} relief;
_Static_assert(sizeof(relief) <= KENT_DEVICE_STATE, "a relief valve's state");

static relief *of(kent_device_state *state) { return (relief *)(void *)state->bytes; }
static const relief *as(const kent_device_state *state)
{
    return (const relief *)(const void *)state->bytes;
}

/* What it should pass, and whether that is less than it passes. 14.11 */
static kent_device_law wish(const relief *r, double flow, double head)
{
    const double above = head - r->set, width = r->full - r->set;
    if (above <= 0.0) return (kent_device_law){flow, 1.0, {0.0, 0.0}};
    const bool open = above >= width;
    const double target = open ? 1.0 : above / width;
    const double root = sqrt(head - r->level); /* head > set > level */
    const double by_head =
        r->capacity * ((open ? 0.0 : root / width) + 0.5 * target / root);
    return (kent_device_law){flow - r->capacity * target * root, 1.0, {-by_head, 0.0}};
}

static kent_status suits(const kent_model *m, const kent_relief_valve *v,
                         const relief *r, double head, kent_error *err)
{
    if (!(r->set > r->level)) {
        return kent_device_refuse(err, m, v->place, v->id,
                                  "at its set_pressure the head is %.2f m, below the "
                                  "discharge_level of %.2f m: nothing would come out",
                                  r->set, r->level);
    }
    if (!(r->low < head)) {
        return kent_device_refuse(err, m, v->place, v->id,
                                  "the steady head of %.2f m is already below that at "
                                  "low_set_pressure, %.2f m: it would open at once",
                                  head, r->low);
    }
    return KENT_OK;
}

static kent_status start(kent_device_state *state, const kent_model *m, int index,
                         double flow, const double head[2], kent_error *err)
{
    const kent_relief_valve *v = &m->relief_valves[index];
    const double weight = m->water.density * m->gravity;
    const double z = m->points[v->point].at.z;
    const kent_stroke whole = {0.0, 1.0};
    relief *r = of(state);
    *r = (relief){.set = z + v->set_pressure / weight,
                  .full = z + v->full_open_pressure / weight,
                  .low = isnan(v->low_set_pressure) ? -(double)INFINITY
                                                    : z + v->low_set_pressure / weight,
                  .level = isnan(v->discharge_level) ? z : v->discharge_level,
                  .capacity = v->capacity,
                  .opening_time = v->opening_time,
                  .closure_time = v->closure_time,
                  .hold_time = v->hold_time,
                  .flow = flow,
                  .armed = true};
    const double heads[2] = {head[0], r->level};
    r->opening =
        flow > 0.0 ? kent_stroke_opening(&whole, r->capacity, flow, heads, 0.0) : 0.0;
    return suits(m, v, r, head[0], err);
}

static void move(kent_device_state *state, const kent_schedule *schedule, double time,
                 double step)
{
    relief *r = of(state);
    (void)schedule;
    r->time = time;
    r->step = step;
    r->stroke = kent_stroke_from(r->opening, step, r->opening_time, r->closure_time);
    if (r->phase != BY_PRESSURE) r->stroke.least = r->stroke.most;
}

static kent_device_law law(const kent_device_state *state, double flow,
                           const double head[2])
{
    const relief *r = as(state);
    const double heads[2] = {head[0], r->level};
    const kent_device_law w = wish(r, flow, head[0]);
    kent_device_law f = kent_stroke_law(flow, heads, r->stroke.least * r->capacity,
                                        r->stroke.most * r->capacity, &w);
    f.by_head[1] = 0.0;
    return f;
}

static void turn(relief *r, double head)
{
    switch (r->phase) {
    case BY_PRESSURE:
        if (head >= r->low) {
            r->armed = true;
        } else if (r->armed) {
            r->armed = false;
            r->phase = OPENS;
        }
        break;
    case OPENS:
        if (r->opening < 1.0) break;
        r->phase = HOLDS;
        r->held_until = r->time + r->hold_time;
        break;
    case HOLDS:
        if (r->time + 0.5 * r->step >= r->held_until) r->phase = BY_PRESSURE;
        break;
    }
}

static void settle(kent_device_state *state, double flow, const double head[2])
{
    relief *r = of(state);
    const double above = head[0] - r->set;
    const double target = fmin(fmax(above / (r->full - r->set), 0.0), 1.0);
    r->opening = fmin(fmax(target, r->stroke.least), r->stroke.most);
    const double passed = r->opening > 0.0 ? flow : 0.0; /* no rests of a search */
    r->discharged += 0.5 * r->step * (r->flow + passed);
    r->flow = passed;
    turn(r, head[0]);
}

static void tell(const kent_device_state *state, double told[KENT_TOLD])
{
    told[0] = as(state)->opening;
    told[1] = as(state)->discharged;
}

const kent_device_ops KENT_AT_RELIEF_VALVE = {
    .quantities = {{"opening", "opening", KENT_RATIO},
                   {"discharged_m3", "discharged", KENT_VOLUME}},
    .start = start,
    .move = move,
    .law = law,
    .settle = settle,
    .tell = tell,
};
