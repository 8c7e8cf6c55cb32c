/* Newton's method with a line search (KINSOL), then plain Newton steps down to
 * rounding. */
#ifndef KENT_NEWTON_INTERNAL_H
#define KENT_NEWTON_INTERNAL_H

#include "kent_equations_internal.h"
#include "kent_steady.h"

typedef struct kent_newton kent_newton;

/* How a solve ended, with the worst equations left open. */
typedef struct kent_newton_end {
    kent_stop stop;
    int iterations;
    double imbalance; /* m3/s, largest of the flow equations */
    double head_gap;  /* m, largest of the head equations */
    size_t imbalance_at,
        head_gap_at; /* which equations; eq->size: none is of the kind */
} kent_newton_end;

/* Keeps eq by reference; link laws (not nodes) may change between solves. */
kent_status kent_newton_new(const kent_equations *eq, kent_newton **out,
                            kent_error *err);
void kent_newton_free(kent_newton *nw);

/* From x to a solution in x, [size]. Fails only for want of memory; whether it
 * converged stands in end->stop. */
kent_status kent_newton_solve(kent_newton *nw, double *x, kent_newton_end *end,
                              kent_error *err);

#endif
