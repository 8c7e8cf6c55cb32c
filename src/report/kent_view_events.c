/* States that scenarios start from, and scenarios, in words. */
#include "kent_view.h"

#include <math.h>
#include <string.h>

static const char *said(const kent_view *v, kent_kind kind, double si, kent_shown *room)
{
    *room = kent_shown_with_unit(kind, v->units, si);
    return room->text;
}

/* m2: holes are small, so in cm2 or in2. */
static void add_hole(const kent_view *v, double area, kent_text *out)
{
    static const double CM2 = 1e-4, IN2 = 6.4516e-4; /* m2 */
    const bool us = v->units == KENT_US;
    kent_text_add(out, "%.3g %s", area / (us ? IN2 : CM2), us ? "in²" : "cm²");
}

/* ---- states ---------------------------------------------------------------------- */

static void say_state(const kent_view *v, const kent_state *s)
{
    const kent_model *m = v->model;
    kent_text words = {0};
    kent_shown level;
    kent_text_add(&words, "%s:", s->id);
    for (size_t i = 0; i < s->level_count; i++) {
        const kent_state_level *l = &m->state_levels[s->level_first + i];
        kent_text_add(&words, " %s at %s,",
                      kent_view_point(m, m->fixed_levels[l->fixed_level].point),
                      said(v, KENT_LENGTH, l->level, &level));
    }
    if (s->level_count == 0) kent_text_add(&words, " levels as they stand,");
    for (size_t i = 0; i < s->running_count; i++) {
        const kent_state_running *r = &m->state_running[s->running_first + i];
        kent_text_add(&words, " %d of %d units of pump %s run,", r->running,
                      m->pumps[r->pump].in_parallel, m->pumps[r->pump].id);
    }
    kent_text_add(&words, " outflows × %.2f, roughness × %.2f.", s->outflow_factor,
                  s->roughness_factor);
    kent_view_say(v, "-  ", &words);
    kent_text_clear(&words);
}

void kent_view_states_said(const kent_view *v)
{
    const kent_model *m = v->model;
    if (m->state_count < 2) return;
    kent_text_add(v->out, "\nSteady states that scenarios start from\n");
    for (size_t i = 0; i < m->state_count; i++) {
        say_state(v, &m->states[i]);
    }
}

/* ---- scenarios ------------------------------------------------------------------- */

static void add_opening(double opening, kent_text *out)
{
    if (opening <= 0.0) {
        kent_text_add(out, "closed");
    } else if (opening >= 1.0) {
        kent_text_add(out, "fully open");
    } else {
        kent_text_add(out, "%.2f open", opening);
    }
}

/* Opening, or m3/s, at the end of an event. */
static double end_of(const kent_model *m, const kent_event *e)
{
    return e->law_count > 0 ? m->law[e->law_first + e->law_count - 1].value : e->to;
}

/* The same where the k-th event of a scenario starts: where the last one before it that
 * moves the same thing ends, else as in steady flow. */
static double start_of(const kent_model *m, const kent_scenario *s, size_t k)
{
    const kent_event *e = &m->events[s->event_first + k];
    const kent_event *last = NULL;
    for (size_t i = 0; i < s->event_count; i++) {
        const kent_event *other = &m->events[s->event_first + i];
        if (other->kind != e->kind || other->target != e->target) continue;
        if (other->start_time >= e->start_time) continue;
        if (!last || other->start_time > last->start_time) last = other;
    }
    if (last) return end_of(m, last);
    switch (e->kind) {
    case KENT_EVENT_VALVE:
        return m->valves[e->target].opening;
    case KENT_EVENT_OUTFLOW:
        return m->outflows[e->target].flow;
    case KENT_EVENT_FIXED_LEVEL:
        return m->fixed_levels[e->target].level;
    case KENT_EVENT_PUMP: /* told in words of its own */
    case KENT_EVENT_BURST:
        break;
    }
    return 0.0;
}

static void add_value(const kent_view *v, kent_event_kind kind, double value,
                      kent_text *out)
{
    kent_shown s;
    switch (kind) {
    case KENT_EVENT_VALVE:
        add_opening(value, out);
        break;
    case KENT_EVENT_OUTFLOW:
        kent_text_add(out, "%s", said(v, KENT_FLOW, value, &s));
        break;
    case KENT_EVENT_PUMP: /* told in words of its own */
        break;
    case KENT_EVENT_FIXED_LEVEL:
        kent_text_add(out, "%s", said(v, KENT_LENGTH, value, &s));
        break;
    case KENT_EVENT_BURST:
        add_hole(v, value, out);
        break;
    }
}

/* "2 units of pump PS trip, ..." */
static void add_pump_event(const kent_view *v, const kent_event *e, kent_text *out)
{
    static const char *const VERBS[] = {[KENT_TRIP] = "lose power",
                                        [KENT_START] = "start",
                                        [KENT_STOP] = "stop",
                                        [KENT_RAMP] = "change speed"};
    const kent_pump *p = &v->model->pumps[e->target];
    if (e->how_many > 0) {
        kent_text_add(out, "%d of %d units of pump %s %s", e->how_many, p->in_parallel,
                      p->id, VERBS[e->action]);
    } else {
        kent_text_add(out, "all units of pump %s that %s %s", p->id,
                      e->action == KENT_START ? "stand still" : "run",
                      VERBS[e->action]);
    }
    if (e->action == KENT_RAMP) kent_text_add(out, " to %.3g of the rated one", e->to);
    if (e->action != KENT_TRIP) kent_text_add(out, " in %.4g s", e->ramp_time);
}

static void add_law(const kent_event *e, kent_text *out)
{
    kent_text_add(out, " by a law of %zu points", e->law_count);
    if (!isnan(e->period)) {
        kent_text_add(out, " that begins again every %.6g s", e->period);
    }
}

/* "valve V1 goes from fully open to closed in 12 s, from 1 s on" */
static void add_event(const kent_view *v, const kent_scenario *s, size_t k,
                      kent_text *out)
{
    const kent_model *m = v->model;
    const kent_event *e = &m->events[s->event_first + k];
    switch (e->kind) {
    case KENT_EVENT_VALVE:
        kent_text_add(out, "valve %s goes from ", m->valves[e->target].id);
        break;
    case KENT_EVENT_OUTFLOW:
        kent_text_add(out, "the outflow at %s goes from ",
                      kent_view_point(m, m->outflows[e->target].point));
        break;
    case KENT_EVENT_PUMP:
        add_pump_event(v, e, out);
        kent_text_add(out, ", from %.4g s on", e->start_time);
        return;
    case KENT_EVENT_FIXED_LEVEL:
        kent_text_add(out, "the level at %s goes from ",
                      kent_view_point(m, m->fixed_levels[e->target].point));
        break;
    case KENT_EVENT_BURST:
        kent_text_add(out, "a burst at %s (coefficient %.2f) opens from ",
                      kent_view_point(m, m->bursts[e->target].point), e->coefficient);
        break;
    }
    add_value(v, e->kind, start_of(m, s, k), out);
    kent_text_add(out, " to ");
    add_value(v, e->kind, end_of(m, e), out);
    if (e->law_count > 0) {
        add_law(e, out);
    } else {
        kent_text_add(out, " in %.4g s", e->ramp_time);
    }
    kent_text_add(out, ", from %.4g s on", e->start_time);
}

/* What it takes over, what it leaves out and what it is for. */
static void add_kin(const kent_model *m, const kent_scenario *s, kent_text *out)
{
    if (s->same_as >= 0) {
        kent_text_add(out, "; as in %s", m->scenarios[s->same_as].id);
    }
    for (size_t i = 0; i < s->without_count; i++) {
        const kent_left_out *left = &m->without[s->without_first + i];
        for (size_t d = 0; d < m->device_count; d++) {
            if (m->devices[d].kind != left->kind) continue;
            if (m->devices[d].index != left->index) continue;
            kent_text_add(out, "%s%s", i > 0 ? ", " : "; without ", m->devices[d].id);
        }
    }
    if (s->for_comparison) {
        kent_text_add(out, "; for comparison, it decides no load case and no limit");
    }
}

static void add_start(const kent_view *v, const kent_scenario *s, kent_text *out)
{
    const kent_model *m = v->model;
    if (m->state_count < 2) return;
    if (s->state_count == 0) {
        kent_text_add(out, "; from every state");
        return;
    }
    for (size_t i = 0; i < s->state_count; i++) {
        kent_text_add(out, "%s%s", i > 0 ? ", " : "; from ",
                      m->states[m->scenario_states[s->state_first + i]].id);
    }
}

void kent_view_scenarios(const kent_view *v)
{
    const kent_model *m = v->model;
    kent_text words = {0};
    if (m->scenario_count > 0) kent_text_add(v->out, "\nScenarios\n");
    for (size_t i = 0; i < m->scenario_count; i++) {
        const kent_scenario *s = &m->scenarios[i];
        const bool titled = s->title[0] != '\0' && strcmp(s->title, s->id) != 0;
        kent_text_add(&words, "%s: %s%s%s, %.4g s", s->id, titled ? s->title : "",
                      titled ? "; " : "", kent_class_word(s->class_of), s->duration);
        add_start(v, s, &words);
        add_kin(m, s, &words);
        for (size_t k = 0; k < s->event_count; k++) {
            kent_text_add(&words, "; ");
            add_event(v, s, k, &words);
        }
        if (s->event_count == 0) kent_text_add(&words, "; nothing moves");
        kent_text_add(&words, ".");
        kent_view_say(v, "-  ", &words);
    }
    kent_text_clear(&words);
}
