/* The second method: a scenario solved by finite volumes in space and IDA in time, from
 * the same steady state and device data as the march, with none of its code (chapter
 * 17). */
#ifndef KENT_SECOND_H
#define KENT_SECOND_H

#include "kent_steady.h"

/* How a span is cut: cells of at most `cell` m, their number times `parts`. stiffness:
 * factor on every wave speed, 1 but for the rigid column. */
typedef struct kent_mesh {
    double cell;
    int parts;
    double stiffness;
} kent_mesh;

/* Of one point of the model; NAN where it is on no pipe. */
typedef struct kent_second_peak {
    double highest, highest_at; /* m, s */
    double lowest, lowest_at;
} kent_second_peak;

typedef struct kent_second_report {
    size_t cells, steps, switches; /* steps of IDA; changes of a device's mode */
    bool below_vapour;             /* some head fell below the vapour limit */
} kent_second_report;

/* From s, the steady state of m (a state's own view), through a scenario (-1: nothing
 * happens, for `duration` s) to its end. extremes: [point_count]. Fails with
 * KENT_E_SOLVE, err->what saying when, where and why it stopped, or KENT_E_NOMEM. */
kent_status kent_second_solve(const kent_model *m, const kent_steady *s, int scenario,
                              double duration, const kent_mesh *mesh,
                              kent_second_peak *extremes, kent_second_report *report,
                              kent_error *err);

#endif
