#include "kent_model_internal.h"

#include <assert.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static kent_status one_state(kent_model *m)
{
    if (m->state_count > 0) return KENT_OK;
    m->states = kent_alloc(1, sizeof *m->states);
    if (!m->states) return KENT_E_NOMEM;
    m->states[0] =
        (kent_state){.outflow_factor = 1.0, .roughness_factor = 1.0, .place = {-1, 0}};
    (void)snprintf(m->states[0].id, sizeof m->states[0].id, "normal");
    m->state_count = 1;
    return KENT_OK;
}

kent_status kent_state_marches(kent_model *m)
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
    return KENT_OK;
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
         *valves = view->valves;
    view->fixed_levels = NULL;
    view->outflows = NULL;
    view->spans = NULL;
    view->valves = NULL;
    if (own(&levels, view->fixed_level_count, sizeof *view->fixed_levels)) return -1;
    view->fixed_levels = levels;
    if (own(&outflows, view->outflow_count, sizeof *view->outflows)) return -1;
    view->outflows = outflows;
    if (own(&spans, view->span_count, sizeof *view->spans)) return -1;
    view->spans = spans;
    if (own(&valves, view->valve_count, sizeof *view->valves)) return -1;
    view->valves = valves;
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
    for (size_t i = 0; i < s->level_count; i++) {
        const kent_state_level *l = &m->state_levels[s->level_first + i];
        view->fixed_levels[l->fixed_level].level = l->level;
    }
    for (size_t i = 0; i < view->outflow_count; i++) {
        view->outflows[i].flow *= s->outflow_factor;
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

void kent_model_view_free(kent_model *view)
{
    if (!view) return;
    free(view->fixed_levels);
    free(view->outflows);
    free(view->spans);
    free(view->valves);
    free(view);
}
