#include "kent_model_internal.h"
#include "kent_parts.h"

#include <assert.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static kent_status one_state(kent_model *m)
{
    if (m->state_count > 0) return KENT_OK;
    free(m->states); /* of an empty list */
    m->states = kent_alloc(1, sizeof *m->states);
    if (!m->states) return KENT_E_NOMEM;
    m->states[0] =
        (kent_state){.outflow_factor = 1.0, .roughness_factor = 1.0, .place = {-1, 0}};
    (void)snprintf(m->states[0].id, sizeof m->states[0].id, "normal");
    m->state_count = 1;
    return KENT_OK;
}

/* Files of results are named "SCENARIO-STATE" where a scenario has several, as here. */
static void check_names(const kent_model *m, kent_complaints *complaints)
{
    for (size_t i = 0; i < m->march_count; i++) {
        for (size_t k = 0; k < i; k++) {
            const kent_name a = kent_march_file_name(m, m->marches[i]);
            const kent_name b = kent_march_file_name(m, m->marches[k]);
            if (strcmp(a.s, b.s) != 0) continue;
            const kent_scenario *s = &m->scenarios[m->marches[i].scenario];
            kent_place_complain(m, s->place, complaints,
                                "scenario \"%s\": its results and those of scenario "
                                "\"%s\" would both be called \"%s\"; give one of them "
                                "another id",
                                s->id, m->scenarios[m->marches[k].scenario].id, a.s);
        }
    }
}

kent_status kent_state_marches(kent_model *m, kent_complaints *complaints)
{
    if (one_state(m) != KENT_OK) return KENT_E_NOMEM;
    m->marches = kent_alloc(m->scenario_count, m->state_count * sizeof *m->marches);
    if (!m->marches) return KENT_E_NOMEM;
    for (size_t i = 0; i < m->scenario_count; i++) {
        const kent_scenario *s = &m->scenarios[i];
        const size_t count = s->state_count > 0 ? s->state_count : m->state_count;
        for (size_t k = 0; k < count; k++) {
            const int state =
                s->state_count > 0 ? m->scenario_states[s->state_first + k] : (int)k;
            m->marches[m->march_count++] = (kent_march){(int)i, state};
        }
    }
    check_names(m, complaints);
    return KENT_OK;
}

/* m: the level of a fixed level in a state. */
static double level_in_state(const kent_model *m, const kent_state *s, size_t fixed)
{
    for (size_t i = 0; i < s->level_count; i++) {
        const kent_state_level *l = &m->state_levels[s->level_first + i];
        if ((size_t)l->fixed_level == fixed) return l->level;
    }
    return m->fixed_levels[fixed].level;
}

kent_status kent_state_levels(kent_model *m)
{
    kent_status status = KENT_E_NOMEM;
    int *part = kent_alloc(m->node_count, sizeof *part);
    double *highest = kent_alloc(m->node_count, sizeof *highest); /* by part */

    m->highest_level = kent_alloc(m->node_count, sizeof *m->highest_level);
    if (!part || !highest || !m->highest_level) goto done;
    kent_parts_find(m, NULL, part);
    for (size_t n = 0; n < m->node_count; n++) {
        highest[n] = (double)NAN;
    }
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        double *of_part = &highest[part[m->fixed_levels[i].node]];
        for (size_t s = 0; s < m->state_count; s++) {
            const double level = level_in_state(m, &m->states[s], i);
            *of_part = fmax(*of_part, level); /* fmax passes over the NAN */
        }
    }
    for (size_t i = 0; i < m->pump_count; i++) {
        const kent_pump *p = &m->pumps[i];
        if (isnan(p->suction_level)) continue;
        highest[part[p->node[1]]] = fmax(highest[part[p->node[1]]], p->suction_level);
    }
    for (size_t n = 0; n < m->node_count; n++) {
        m->highest_level[n] = highest[part[n]];
    }
    status = KENT_OK;
done:
    free(part);
    free(highest);
    return status;
}

/* C of Hazen-Williams falls as a pipe roughens, the other coefficients rise. */
static void roughen(kent_span *span, double factor)
{
    if (span->friction.law == KENT_HAZEN_WILLIAMS) {
        span->friction.coefficient /= factor;
    } else {
        span->friction.coefficient *= factor;
    }
}

/* *array becomes a copy of its own. */
static int own(void **array, size_t count, size_t size)
{
    void *copy = kent_alloc(count, size);
    if (!copy) return -1;
    if (count > 0) memcpy(copy, *array, count * size);
    *array = copy;
    return 0;
}

/* What a view owns; everything else is the model's. */
static int own_what_states_change(kent_model *view)
{
    void *levels = view->fixed_levels, *outflows = view->outflows, *spans = view->spans,
         *valves = view->valves, *pumps = view->pumps;
    view->fixed_levels = NULL;
    view->outflows = NULL;
    view->spans = NULL;
    view->valves = NULL;
    view->pumps = NULL;
    if (own(&levels, view->fixed_level_count, sizeof *view->fixed_levels)) return -1;
    view->fixed_levels = levels;
    if (own(&outflows, view->outflow_count, sizeof *view->outflows)) return -1;
    view->outflows = outflows;
    if (own(&spans, view->span_count, sizeof *view->spans)) return -1;
    view->spans = spans;
    if (own(&valves, view->valve_count, sizeof *view->valves)) return -1;
    view->valves = valves;
    if (own(&pumps, view->pump_count, sizeof *view->pumps)) return -1;
    view->pumps = pumps;
    return 0;
}

kent_model *kent_model_in_state(const kent_model *m, int state, const double *capacity)
{
    assert(state >= 0 && (size_t)state < m->state_count);
    const kent_state *s = &m->states[state];
    kent_model *view = kent_alloc(1, sizeof *view);
    if (!view) return NULL;
    *view = *m;
    if (own_what_states_change(view)) {
        kent_model_view_free(view);
        return NULL;
    }
    for (size_t i = 0; i < view->fixed_level_count; i++) {
        view->fixed_levels[i].level = level_in_state(m, s, i);
    }
    for (size_t i = 0; i < view->outflow_count; i++) {
        view->outflows[i].flow *= s->outflow_factor;
    }
    for (size_t i = 0; i < s->running_count; i++) {
        const kent_state_running *r = &m->state_running[s->running_first + i];
        view->pumps[r->pump].running = r->running;
    }
    for (size_t i = 0; i < view->span_count; i++) {
        roughen(&view->spans[i], s->roughness_factor);
    }
    for (size_t i = 0; capacity && i < view->valve_count; i++) {
        if (isfinite(capacity[i])) {
            view->valves[i].capacity = capacity[i];
            view->valves[i].flow = (double)NAN;
        }
    }
    return view;
}

kent_name kent_name_in_state(const kent_model *m, const char *name, int state)
{
    kent_name out;
    if (state < 0 || m->state_count < 2) {
        (void)snprintf(out.s, sizeof out.s, "%s", name);
    } else {
        (void)snprintf(out.s, sizeof out.s, "%s (%s)", name, m->states[state].id);
    }
    return out;
}

kent_name kent_march_file_name(const kent_model *m, kent_march march)
{
    kent_name out;
    size_t states = 0;
    for (size_t i = 0; i < m->march_count; i++) {
        if (m->marches[i].scenario == march.scenario) states++;
    }
    (void)snprintf(out.s, sizeof out.s, "%s%s%s", m->scenarios[march.scenario].id,
                   states > 1 ? "-" : "", states > 1 ? m->states[march.state].id : "");
    return out;
}

void kent_model_view_free(kent_model *view)
{
    if (!view) return;
    free(view->fixed_levels);
    free(view->outflows);
    free(view->spans);
    free(view->valves);
    free(view->pumps);
    free(view);
}
