/* What the recorder keeps along pipes, besides fittings: runs above ground and ends of
 * strings. Only thrust/ looks inside. */
#ifndef KENT_ALONG_INTERNAL_H
#define KENT_ALONG_INTERNAL_H

#include "kent_loads.h"

typedef struct kent_run_seen { /* of one run in one march */
    kent_run_moment lowest, highest;
    kent_run_moment row[KENT_RUN_ROWS]; /* time NAN: no instant yet */
} kent_run_seen;

typedef struct kent_end_seen { /* of one end of a string in one march */
    double highest, at;        /* m, head; s */
} kent_end_seen;

typedef struct kent_along {
    kent_run *runs;
    size_t run_count;
    kent_strings strings;
    size_t *run_watch;       /* [2 run_count] of a run's start and end */
    size_t *end_watch;       /* [end_count] */
    kent_run_seen *run_seen; /* [march_count][run_count] */
    kent_end_seen *end_seen; /* [march_count][end_count] */
} kent_along;

/* Adds its watches to those of r, whose other parts stand already. */
kent_status kent_along_new(kent_recorder *r, kent_error *err);
void kent_along_free(kent_along *a);
void kent_along_start(kent_recorder *r, int march);
void kent_along_take(kent_recorder *r, int march, const kent_trace *trace);

/* Runs and strings of loads, whose test is known. */
kent_status kent_along_finish(const kent_recorder *r, kent_loads_result *loads,
                              kent_error *err);

/* Index of the watch at a place, added where it is new among those from `first` on. */
int kent_recorder_watch(kent_recorder *r, size_t first, int span, double chainage,
                        size_t *index);

#endif
