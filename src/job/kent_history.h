/* Keeping a scenario's histories: one row per step, thinned evenly, extremes kept. */
#ifndef KENT_HISTORY_H
#define KENT_HISTORY_H

#include "kent_job.h"

/* Keeps every stride-th instant as it comes, and beside it, for every place, the whole
 * row of its highest and of its lowest head so far. */
typedef struct kent_history_keeper kent_history_keeper;

/* steps: instants that will come; rows: most rows of the even part; places, devices:
 * columns. */
kent_status kent_history_keeper_new(size_t steps, size_t rows, size_t places,
                                    size_t devices, kent_history_keeper **out,
                                    kent_error *err);

/* head, flow: [places] m, m3/s, devices: [devices], of one instant; instants come in
 * order of time (s). */
void kent_history_keep(kent_history_keeper *k, double time, const double *head,
                       const double *flow, const kent_device_row *devices);

/* Rows by time, each instant once. *out is the caller's: kent_history_clear. */
kent_status kent_history_finish(const kent_history_keeper *k, kent_history *out,
                                kent_error *err);
void kent_history_keeper_free(kent_history_keeper *k);
void kent_history_clear(kent_history *h);

#endif
