/* The grid: every span in a whole number of reaches at Courant number one, on one step.
 *
 * If not every wish can be met: first the work stays within the budget, then wave
 * speeds move by no more than the tolerance, then min_reaches. Spans that miss are
 * marked. */
#ifndef KENT_GRID_H
#define KENT_GRID_H

#include "kent_model.h"

typedef struct kent_grid {
    double step;             /* s */
    int *reaches;            /* [span_count] at least 1 */
    double *wave_speed_used; /* [span_count] m/s: length / (reaches x step) */
    bool *misses;            /* [span_count] moved by more than the tolerance */
    size_t miss_count;
    size_t node_total; /* sum of reaches + 1 */
} kent_grid;

/* duration: s, the longest scenario, for the budget of node updates. Fails with
 * KENT_E_INPUT where time_step is given and longer than the budget or the shortest
 * sensible one allows, KENT_E_NOMEM. */
kent_status kent_grid_plan(const kent_model *m, double duration, kent_grid **out,
                           kent_error *err);

/* The same wave speeds at step/parts: every reach cut in parts. */
kent_status kent_grid_refine(const kent_grid *grid, size_t span_count, int parts,
                             kent_grid **out, kent_error *err);
void kent_grid_free(kent_grid *g);

#endif
