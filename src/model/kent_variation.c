#include "kent_model.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

static const struct {
    const char *word;
    double less, more; /* factors */
} VARIES[KENT_VARIES] = {
    [KENT_VARY_WAVE_SPEED] = {"wave speed", 0.9, 1.1},
    [KENT_VARY_INERTIA] = {"pump inertia", 0.5, 1.5},
    [KENT_VARY_CHECK_DELAY] = {"check valves", 0.0, 2.0},
    [KENT_VARY_AIR_VALVES] = {"air valves", 0.75, 1.25},
    [KENT_VARY_EVENT_TIME] = {"event times", 0.8, 1.2},
};

kent_variation kent_variation_of(kent_vary what, bool more)
{
    return (kent_variation){what, more, more ? VARIES[what].more : VARIES[what].less};
}

const char *kent_vary_word(kent_vary what) { return VARIES[what].word; }

/* ---- events ---------------------------------------------------------------------- */

/* s from its start to its end; 0: at once, or none of its own. */
static double lasts(const kent_model *m, const kent_event *e)
{
    if (e->law_count > 0) return m->law[e->law_first + e->law_count - 1].time;
    return isfinite(e->ramp_time) ? e->ramp_time : 0.0;
}

/* A level outside that moves, or a demand that comes again each day, is no closure. */
static bool is_stretched(const kent_model *m, const kent_event *e)
{
    if (e->kind == KENT_EVENT_FIXED_LEVEL || !isnan(e->period)) return false;
    return lasts(m, e) > 0.0;
}

static bool trips(const kent_event *e)
{
    return e->kind == KENT_EVENT_PUMP && e->action == KENT_TRIP;
}

static bool any_event(const kent_model *m, kent_vary what)
{
    for (size_t i = 0; i < m->scenario_count; i++) {
        const kent_scenario *s = &m->scenarios[i];
        for (size_t k = 0; k < s->event_count; k++) {
            const kent_event *e = &m->events[s->event_first + k];
            if (what == KENT_VARY_INERTIA ? trips(e) : is_stretched(m, e)) return true;
        }
    }
    return false;
}

/* s: how much later the last event of a scenario ends. */
static double later(const kent_model *m, const kent_scenario *s, double factor)
{
    double before = 0.0, after = 0.0;
    for (size_t k = 0; k < s->event_count; k++) {
        const kent_event *e = &m->events[s->event_first + k];
        const double by = is_stretched(m, e) ? factor : 1.0;
        before = fmax(before, e->start_time + lasts(m, e));
        after = fmax(after, e->start_time + by * lasts(m, e));
    }
    return fmax(0.0, after - before);
}

/* Events of several scenarios may go by one law: each point is worked out from m's. */
static void stretch(const kent_model *m, kent_event *e, kent_law_point *law,
                    double factor)
{
    if (!is_stretched(m, e)) return;
    if (e->law_count == 0) e->ramp_time *= factor;
    for (size_t i = e->law_first; i < e->law_first + e->law_count; i++) {
        law[i].time = factor * m->law[i].time;
    }
}

/* ---- check valves ---------------------------------------------------------------- */

static double moved_delay(double delay, kent_variation v)
{
    if (v.more && !(delay > 0.0)) return KENT_VARY_IDEAL_DELAY;
    return v.factor * delay;
}

static double pump_delay(const kent_pump *p)
{
    return p->check_valve == KENT_CHECK_DELAYED ? p->check_delay : 0.0;
}

static void delay_pump(kent_pump *p, kent_variation v)
{
    if (p->check_valve == KENT_CHECK_NONE) return;
    p->check_delay = moved_delay(pump_delay(p), v);
    p->check_valve = p->check_delay > 0.0 ? KENT_CHECK_DELAYED : KENT_CHECK_IDEAL;
}

static bool any_delay_moves(const kent_model *m, kent_variation v)
{
    for (size_t i = 0; i < m->pump_count; i++) {
        const kent_pump *p = &m->pumps[i];
        if (p->check_valve == KENT_CHECK_NONE) continue;
        if (v.more || pump_delay(p) > 0.0) return true;
    }
    for (size_t i = 0; i < m->check_valve_count; i++) {
        if (v.more || m->check_valves[i].delay > 0.0) return true;
    }
    return false;
}

/* ---- the whole ------------------------------------------------------------------- */

bool kent_variation_tells(const kent_model *m, kent_variation v)
{
    if (m->scenario_count == 0) return false; /* nothing moves in still water */
    switch (v.what) {
    case KENT_VARY_WAVE_SPEED:
        return m->span_count > 0;
    case KENT_VARY_INERTIA:
    case KENT_VARY_EVENT_TIME:
        return any_event(m, v.what);
    case KENT_VARY_CHECK_DELAY:
        return any_delay_moves(m, v);
    case KENT_VARY_AIR_VALVES:
        return m->air_valve_count > 0;
    case KENT_VARIES:
        break;
    }
    return false;
}

static void vary(const kent_model *m, kent_model *view, kent_variation v)
{
    for (size_t i = 0; v.what == KENT_VARY_WAVE_SPEED && i < view->span_count; i++) {
        view->spans[i].wave_speed *= v.factor;
    }
    for (size_t i = 0; v.what == KENT_VARY_INERTIA && i < view->pump_count; i++) {
        view->pumps[i].inertia *= v.factor;
    }
    for (size_t i = 0; v.what == KENT_VARY_CHECK_DELAY && i < view->pump_count; i++) {
        delay_pump(&view->pumps[i], v);
    }
    for (size_t i = 0; v.what == KENT_VARY_CHECK_DELAY && i < view->check_valve_count;
         i++) {
        view->check_valves[i].delay = moved_delay(view->check_valves[i].delay, v);
    }
    for (size_t i = 0; v.what == KENT_VARY_AIR_VALVES && i < view->air_valve_count;
         i++) {
        view->air_valves[i].admission_coefficient *= v.factor;
        view->air_valves[i].release_coefficient *= v.factor;
    }
    if (v.what != KENT_VARY_EVENT_TIME) return;
    for (size_t i = 0; i < view->scenario_count; i++) {
        view->scenarios[i].duration += later(m, &m->scenarios[i], v.factor);
    }
    for (size_t i = 0; i < view->event_count; i++) {
        stretch(m, &view->events[i], view->law, v.factor);
    }
}

/* A copy of an array; NULL: no memory. */
static void *copy_of(const void *array, size_t count, size_t size)
{
    void *copy = kent_alloc(count, size);
    if (copy && count > 0) memcpy(copy, array, count * size);
    return copy;
}

kent_model *kent_model_varied(const kent_model *m, kent_variation v)
{
    kent_model *view = kent_alloc(1, sizeof *view);
    if (!view) return NULL;
    *view = *m;
    view->spans = copy_of(m->spans, m->span_count, sizeof *m->spans);
    view->pumps = copy_of(m->pumps, m->pump_count, sizeof *m->pumps);
    view->check_valves =
        copy_of(m->check_valves, m->check_valve_count, sizeof *m->check_valves);
    view->air_valves =
        copy_of(m->air_valves, m->air_valve_count, sizeof *m->air_valves);
    view->scenarios = copy_of(m->scenarios, m->scenario_count, sizeof *m->scenarios);
    view->events = copy_of(m->events, m->event_count, sizeof *m->events);
    view->law = copy_of(m->law, m->law_count, sizeof *m->law);
    if (!view->spans || !view->pumps || !view->check_valves || !view->air_valves ||
        !view->scenarios || !view->events || !view->law) {
        kent_model_varied_free(view);
        return NULL;
    }
    vary(m, view, v);
    return view;
}

void kent_model_varied_free(kent_model *view)
{
    if (!view) return;
    free(view->spans);
    free(view->pumps);
    free(view->check_valves);
    free(view->air_valves);
    free(view->scenarios);
    free(view->events);
    free(view->law);
    free(view);
}
