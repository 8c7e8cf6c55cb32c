#include "kent_timetable_internal.h"

#include <assert.h>
#include <math.h>
#include <stdlib.h>

static kent_status add_piece(kent_timetable *t, double start, double value,
                             double slope, kent_error *err)
{
    void *pieces = t->pieces;
    if (kent_grow(&pieces, &t->capacity, t->count + 1, sizeof *t->pieces) != 0) {
        return kent_error_nomem(err);
    }
    t->pieces = pieces;
    t->pieces[t->count++] = (kent_piece){start, value, slope};
    return KENT_OK;
}

static double piece_value(const kent_piece *p, double time)
{
    return p->value + p->slope * (time - p->start);
}

/* The value that the pieces reach by a time, of which those that start later, or just
 * then, are dropped. */
static double cut_at(kent_timetable *t, double time)
{
    double value = t->pieces[0].value;
    size_t kept = 0;
    for (; kept < t->count && t->pieces[kept].start < time; kept++) {
        value = piece_value(&t->pieces[kept], time);
    }
    if (kept == 0) value = t->pieces[0].value;
    t->count = kept;
    return value;
}

kent_status kent_timetable_ramp(kent_timetable *t, double start, double ramp, double to,
                                kent_error *err)
{
    const double from = cut_at(t, start);
    kent_status status = KENT_OK;
    if (ramp > 0.0) status = add_piece(t, start, from, (to - from) / ramp, err);
    return status ? status : add_piece(t, start + fmax(ramp, 0.0), to, 0.0, err);
}

/* The points of a law once, from `begin` s on. */
static kent_status add_law(kent_timetable *t, const kent_law_point *law, size_t count,
                           double begin, kent_error *err)
{
    kent_status status = KENT_OK;
    for (size_t i = 0; i < count && !status; i++) {
        double slope = 0.0;
        if (i + 1 < count) {
            slope = (law[i + 1].value - law[i].value) / (law[i + 1].time - law[i].time);
        }
        status = add_piece(t, begin + law[i].time, law[i].value, slope, err);
    }
    return status;
}

static kent_status add_event(kent_timetable *t, const kent_model *m,
                             const kent_event *e, double until, kent_error *err)
{
    const kent_law_point *law = m->law + e->law_first;
    if (e->law_count == 0) {
        return kent_timetable_ramp(t, e->start_time, e->ramp_time, e->to, err);
    }
    const double from = cut_at(t, e->start_time);
    kent_status status = KENT_OK;
    if (law[0].time > 0.0) status = add_piece(t, e->start_time, from, 0.0, err);
    double begin = e->start_time;
    do {
        if (!status) status = add_law(t, law, e->law_count, begin, err);
        begin += e->period;
    } while (!status && e->period > 0.0 && begin < until);
    return status;
}

kent_status kent_timetable_fill(kent_timetable *t, const kent_model *m, int scenario,
                                kent_event_kind kind, int target, double from,
                                kent_error *err)
{
    const kent_scenario none = {0};
    const kent_scenario *of = scenario < 0 ? &none : &m->scenarios[scenario];
    const kent_event *events = m->events + of->event_first;
    double after = -INFINITY; /* s: events are taken by start, equal ones as listed */
    kent_status status = add_piece(t, 0.0, from, 0.0, err);

    for (size_t taken = 0; taken < of->event_count && !status;) {
        double next = INFINITY;
        for (size_t i = 0; i < of->event_count; i++) {
            if (events[i].start_time > after) next = fmin(next, events[i].start_time);
        }
        for (size_t i = 0; i < of->event_count && !status; i++) {
            const kent_event *e = &events[i];
            if (e->start_time != next) continue;
            taken++;
            if (e->kind != kind || e->target != target) continue;
            status = add_event(t, m, e, of->duration, err);
        }
        after = next;
    }
    return status;
}

void kent_timetable_clear(kent_timetable *t)
{
    free(t->pieces);
    *t = (kent_timetable){0};
}

void kent_timetable_move(kent_timetable *t, double time)
{
    while (t->now + 1 < t->count && t->pieces[t->now + 1].start <= time) {
        t->now++;
    }
}

double kent_timetable_next(const kent_timetable *t)
{
    return t->now + 1 < t->count ? t->pieces[t->now + 1].start : INFINITY;
}

double kent_timetable_value(const kent_timetable *t, double time)
{
    assert(t->count > 0);
    return piece_value(&t->pieces[t->now], time);
}
