/* A scenario marched once from one state, on one grid, into peaks, envelopes and
 * histories. */
#ifndef KENT_SCENARIO_RUN_H
#define KENT_SCENARIO_RUN_H

#include "kent_history.h"
#include "kent_viewpoint.h"

typedef struct kent_scenario_run {
    const kent_steady *steady; /* of its state: marched on that one's model */
    const kent_viewpoints *views;
    const kent_grid *grid;
    int march;               /* index into the model's marches */
    kent_recorder *recorder; /* NULL: peaks only */
} kent_scenario_run;

/* Marches to the end of the scenario. With a recorder, fills out->step, steps, points,
 * devices, highest, lowest, history, below_vapour and touched, and the recorder's slot;
 * without one only out->points and devices. out->grid is left alone. */
kent_status kent_scenario_run_march(const kent_scenario_run *run,
                                    kent_scenario_result *out, kent_error *err);
void kent_scenario_result_clear(kent_scenario_result *r, size_t span_count);

#endif
