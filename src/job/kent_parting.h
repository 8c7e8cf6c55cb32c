/* Where the water came apart in a march, and what that does to what can be said. */
#ifndef KENT_PARTING_H
#define KENT_PARTING_H

#include "kent_job.h"
#include "kent_said.h"

/* Fills cavities, cavity_count and hollow of out; grid: the march's. */
kent_status kent_parting_take(const kent_model *m, const kent_grid *grid,
                              const kent_marcher *march, kent_scenario_result *out,
                              kent_error *err);

/* Cautions of the run, of every fitting that a cavity opened at, and of every fitting
 * whose governing peak comes after one has closed. */
void kent_parting_judge(kent_results *r, const kent_scenario_result *run);

/* m3 in litres or US gallons: cavities are small. */
kent_said kent_parting_volume(kent_system system, double volume);

#endif
