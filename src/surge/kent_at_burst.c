/* A burst: a hole to the air, of an area that an event opens. Water leaves it; where
 * the pressure is below that of the air nothing enters, and it is said. */
#include "kent_stroke_internal.h"

#include <math.h>

typedef struct hole {
    int index;
    double level;          /* m, of the hole */
    double twice_gravity;  /* m/s2 */
    double step;           /* s */
    double capacity, area; /* m^2.5/s with its coefficient, m2; of this step */
    double flow;           /* m3/s, settled last */
    double discharged;     /* m3 since t = 0 */
    bool sucked;           /* the head has been below the hole while it was open */
} hole;
_Static_assert(sizeof(hole) <= KENT_DEVICE_STATE, "a burst's state");

static hole *of(kent_device_state *state) { return (hole *)(void *)state->bytes; }
static const hole *as(const kent_device_state *state)
{
    return (const hole *)(const void *)state->bytes;
}

static kent_status start(kent_device_state *state, const kent_model *m, int index,
                         double flow, const double head[2], kent_error *err)
{
    (void)flow; /* whole until an event breaks it */
    (void)head;
    (void)err;
    *of(state) = (hole){.index = index,
                        .level = m->points[m->bursts[index].point].at.z,
                        .twice_gravity = 2.0 * m->gravity};
    return KENT_OK;
}

/* 14.15 */
static void move(kent_device_state *state, const kent_schedule *schedule, double time,
                 double step)
{
    hole *h = of(state);
    const kent_course *course =
        kent_schedule_course(schedule, KENT_EVENT_BURST, h->index);
    h->step = step;
    if (!course) return; /* another scenario's */
    const kent_event *event = kent_schedule_move(schedule, course, time)->event;
    h->area = kent_schedule_value(schedule, course, time);
    h->capacity = event->coefficient * h->area * sqrt(h->twice_gravity);
}

static kent_device_law law(const kent_device_state *state, double flow,
                           const double head[2])
{
    const hole *h = as(state);
    const double heads[2] = {head[0], h->level};
    kent_device_law f = kent_stroke_law(flow, heads, h->capacity, h->capacity, NULL);
    f.by_head[1] = 0.0;
    return f;
}

static void settle(kent_device_state *state, double flow, const double head[2])
{
    hole *h = of(state);
    const double passed = h->capacity > 0.0 ? flow : 0.0; /* no rests of a search */
    h->discharged += 0.5 * h->step * (h->flow + passed);
    h->flow = passed;
    if (h->capacity > 0.0 && head[0] < h->level) h->sucked = true;
}

static void tell(const kent_device_state *state, double told[KENT_TOLD])
{
    told[0] = as(state)->area;
    told[1] = as(state)->discharged;
}

static const char *caution(const kent_device_state *state)
{
    return as(state)->sucked
               ? "is at times under less than atmospheric pressure: air, or dirty "
                 "water "
                 "from the ground, would then be drawn in, which is not followed"
               : NULL;
}

const kent_device_ops KENT_AT_BURST = {
    .quantities = {{"area_m2", "area", KENT_AREA},
                   {"discharged_m3", "discharged", KENT_VOLUME}},
    .start = start,
    .move = move,
    .law = law,
    .settle = settle,
    .tell = tell,
    .caution = caution,
};
