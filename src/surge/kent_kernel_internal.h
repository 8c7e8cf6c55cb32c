/* The sweep: what one step does to every node of every span.
 *
 * Stored are the two characteristics that arrive at a node at the present instant,
 * both in metres (docs/theory 7.6):
 *
 *     p = H + B Q   from the left,      m = H - B Q   from the right.
 *
 * So H = (p + m)/2 and d = p - m = 2 B Q. What leaves the node again has lost the
 * friction of the reach ahead, R Q|Q| = k d|d| with k = R/(4 B^2) (7.7):
 *
 *     f = k d|d|,    p <- p - f  goes right,    m <- m + f  goes left.
 *
 * One step later the neighbours receive these very numbers, so nothing is copied: the
 * array p is read one place further left and m one place further right. No constant of
 * a pipe but k enters, so all spans lie end to end in one loop; the first p and the
 * last m of a span are written by its ends (kent_ends_internal.h) before the sweep.
 *
 * Explicit: stable while k|d| = R|Q|/(2B) stays below `limit`; a node beyond is left
 * as it is, so that it can be found, and counted. Point-implicit (7.10):
 * f = k d|d|/(1 + 2 k|d|), stable whatever d; limit DBL_MAX then counts NaN alone.
 *
 * The envelopes keep p + m, twice the head: halving is exact and is left to whoever
 * looks. */
#ifndef KENT_KERNEL_INTERNAL_H
#define KENT_KERNEL_INTERNAL_H

#include "kent_base.h"
#include "kent_fade_internal.h"

#include <math.h>
#include <stddef.h>
#include <stdint.h>

/* k, p, m, highest, lowest: [n]. Returns the number of nodes beyond the limit. */
typedef int64_t kent_sweep(size_t n, double limit, const double *restrict k,
                           double *restrict p, double *restrict m,
                           double *restrict highest, double *restrict lowest);

typedef struct kent_kernel {
    const char *name;
    kent_sweep *explicit_sweep, *implicit_sweep;
    kent_fade_pass *recall, *yield; /* of one span: friction, wall */
} kent_kernel;

/* The best the processor has; wanted, if not NULL or empty, names another. Fails with
 * KENT_E_INPUT where that is unknown or the processor lacks it. */
kent_status kent_kernel_pick(const char *wanted, const kent_kernel **out,
                             kent_error *err);

/* One body for every instruction set: each caller compiles it for its own. */
static inline __attribute__((always_inline)) int64_t
kent_kernel_body(size_t n, double limit, int implicit, const double *restrict k,
                 double *restrict p, double *restrict m, double *restrict highest,
                 double *restrict lowest)
{
    int64_t within = 0;
    for (size_t i = 0; i < n; i++) {
        const double twice_head = p[i] + m[i];
        const double d = p[i] - m[i];
        const double kd = k[i] * fabs(d);
        const double drag = implicit ? kd * d / (1.0 + 2.0 * kd) : kd * d;
        const double f = kd <= limit ? drag : 0.0;
        within += kd <= limit ? 1 : 0; /* NaN is not */
        highest[i] = twice_head > highest[i] ? twice_head : highest[i];
        lowest[i] = twice_head < lowest[i] ? twice_head : lowest[i];
        p[i] -= f;
        m[i] += f;
    }
    return (int64_t)n - within;
}

#endif
