#include "kent_scenario_run.h"

#include <stdlib.h>

void kent_results_free(kent_results *r)
{
    if (!r) return;
    for (size_t i = 0; i < r->scenario_count; i++) {
        kent_scenario_result_clear(&r->scenarios[i], r->model->span_count);
    }
    free(r->scenarios);
    free(r->history_points);
    kent_restraints_free(r->restraints);
    kent_loads_free(r->loads);
    kent_steady_free_states(r->steadies, r->steady_count);
    free(r->limits);
    kent_sensitivity_free(r->sensitivity);
    kent_notes_clear(&r->cautions);
    free(r);
}
