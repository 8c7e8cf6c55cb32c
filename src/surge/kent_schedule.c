#include "kent_schedule_internal.h"

#include <math.h>
#include <stdlib.h>

/* Share of a ramp that rounding of a counted time may leave undone: "shut" must mean
 * shut. */
static const double RAMP_END = 1.0 - 1e-12;

static double by_law(const kent_move *move, double elapsed)
{
    const kent_law_point *law = move->law;
    const size_t n = move->event->law_count;
    const double period = move->event->period;
    size_t i = 0;
    double before = move->from; /* its first point */

    if (period > 0.0 && elapsed >= period) {
        elapsed -= period * floor(elapsed / period);
        before = law[n - 1].value;
    }
    while (i < n && law[i].time <= elapsed) {
        i++;
    }
    if (i == 0) return before;
    if (i == n) return law[n - 1].value;
    const double share = (elapsed - law[i - 1].time) / (law[i].time - law[i - 1].time);
    return law[i - 1].value + share * (law[i].value - law[i - 1].value);
}

static double by_ramp(const kent_move *move, double elapsed)
{
    const double ramp = move->event->ramp_time, to = move->event->to;
    if (elapsed >= ramp * RAMP_END) return to;
    return move->from + (to - move->from) * (elapsed / ramp);
}

const kent_course *kent_schedule_course(const kent_schedule *s, kent_event_kind kind,
                                        int target)
{
    for (size_t i = 0; i < s->course_count; i++) {
        if (s->courses[i].kind == kind && s->courses[i].target == target) {
            return &s->courses[i];
        }
    }
    return NULL;
}

const kent_move *kent_schedule_move(const kent_schedule *s, const kent_course *course,
                                    double time)
{
    const kent_move *move = &s->moves[course->first];
    for (size_t i = 1; i < course->count; i++) {
        if (s->moves[course->first + i].event->start_time > time) break;
        move = &s->moves[course->first + i];
    }
    return move;
}

double kent_schedule_value(const kent_schedule *s, const kent_course *course,
                           double time)
{
    const kent_move *move = kent_schedule_move(s, course, time);
    const double elapsed = time - move->event->start_time;
    if (elapsed < 0.0) return move->from;
    return move->event->law_count > 0 ? by_law(move, elapsed) : by_ramp(move, elapsed);
}

static double steady_value(const kent_model *m, const kent_course *c)
{
    switch (c->kind) {
    case KENT_EVENT_VALVE:
        return m->valves[c->target].opening;
    case KENT_EVENT_OUTFLOW:
        return m->outflows[c->target].flow;
    case KENT_EVENT_FIXED_LEVEL:
        return m->fixed_levels[c->target].level;
    case KENT_EVENT_PUMP: /* share of its rated speed */
        return 1.0;
    case KENT_EVENT_BURST:
        break; /* no hole yet */
    }
    return 0.0;
}

/* The events of one target, in order of start; equal starts keep the case's order. */
static void add_course(const kent_model *m, const kent_scenario *of,
                       const kent_event *first, kent_schedule *s, size_t *used)
{
    kent_course *c = &s->courses[s->course_count++];
    *c = (kent_course){first->kind, first->target, *used, 0};
    for (size_t i = 0; i < of->event_count; i++) {
        const kent_event *e = &m->events[of->event_first + i];
        if (e->kind != c->kind || e->target != c->target) continue;
        size_t at = c->first + c->count;
        while (at > c->first && s->moves[at - 1].event->start_time > e->start_time) {
            s->moves[at] = s->moves[at - 1];
            at--;
        }
        s->moves[at] = (kent_move){
            .event = e, .law = e->law_count > 0 ? m->law + e->law_first : NULL};
        c->count++;
    }
    *used += c->count;

    const size_t count = c->count;
    s->moves[c->first].from = steady_value(m, c);
    for (size_t i = 1; i < count; i++) { /* each starts where those before have got */
        c->count = i;
        s->moves[c->first + i].from =
            kent_schedule_value(s, c, s->moves[c->first + i].event->start_time);
    }
    c->count = count;
}

kent_status kent_schedule_new(const kent_model *m, int scenario, kent_schedule **out,
                              kent_error *err)
{
    const kent_scenario none = {0};
    const kent_scenario *of = scenario < 0 ? &none : &m->scenarios[scenario];
    size_t used = 0;
    kent_schedule *s = kent_alloc(1, sizeof *s);

    if (!s) return kent_error_nomem(err);
    s->courses = kent_alloc(of->event_count, sizeof *s->courses);
    s->moves = kent_alloc(of->event_count, sizeof *s->moves);
    if (!s->courses || !s->moves) {
        kent_schedule_free(s);
        return kent_error_nomem(err);
    }
    for (size_t i = 0; i < of->event_count; i++) {
        const kent_event *e = &m->events[of->event_first + i];
        if (kent_schedule_course(s, e->kind, e->target)) continue;
        add_course(m, of, e, s, &used);
    }
    *out = s;
    return KENT_OK;
}

void kent_schedule_free(kent_schedule *s)
{
    if (!s) return;
    free(s->courses);
    free(s->moves);
    free(s);
}
