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
 * looks.
 *
 * A watching sweep also marks blocks in which some p or m fell below the block's floor
 * while it went on its way: as long as none does, no head inside can be low at the next
 * instant (docs/theory 15.10). */
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

enum { KENT_BLOCK = 128 }; /* nodes, but for a last one that may have less */

typedef struct kent_floor { /* m */
    double p, m;
} kent_floor;

/* The same for n nodes that are whole blocks from the first on; p[-1] and m[n] are
 * there to be read. low[block] is set to 1 where its floor was crossed
 * or a node was beyond the limit, else left. */
typedef int64_t kent_watching_sweep(size_t n, double limit, const double *restrict k,
                                    double *restrict p, double *restrict m,
                                    double *restrict highest, double *restrict lowest,
                                    const kent_floor *restrict floors,
                                    uint8_t *restrict low);

typedef struct kent_kernel {
    const char *name;
    kent_sweep *explicit_sweep, *implicit_sweep;
    kent_watching_sweep *explicit_watch, *implicit_watch;
    kent_fade_pass *recall, *yield; /* of one span: friction, wall */
} kent_kernel;

/* The best the processor has; wanted, if not NULL or empty, names another. Fails with
 * KENT_E_INPUT where that is unknown or the processor lacks it. */
kent_status kent_kernel_pick(const char *wanted, const kent_kernel **out,
                             kent_error *err);

/* NOLINTBEGIN(readability-function-size): arrays that restrict must name */

/* One body for every instruction set: each caller compiles it for its own. floor NULL:
 * nothing is watched. Returns the number of nodes within the limit and above the floor:
 * one count costs less than two. */
static inline __attribute__((always_inline)) int64_t
kent_kernel_body(size_t n, double limit, int implicit, const double *restrict k,
                 double *restrict p, double *restrict m, double *restrict highest,
                 double *restrict lowest, const kent_floor *floor)
{
    const double floor_p = floor ? floor->p : 0.0, floor_m = floor ? floor->m : 0.0;
    int64_t well = 0;
    for (size_t i = 0; i < n; i++) {
        const double twice_head = p[i] + m[i];
        const double d = p[i] - m[i];
        const double kd = k[i] * fabs(d);
        const double drag = implicit ? kd * d / (1.0 + 2.0 * kd) : kd * d;
        const double f = kd <= limit ? drag : 0.0;
        const double right = p[i] - f, left = m[i] + f;
        const bool high = !floor || ((right >= floor_p) & (left >= floor_m));
        well += (kd <= limit) & high; /* NaN is not */
        highest[i] = twice_head > highest[i] ? twice_head : highest[i];
        lowest[i] = twice_head < lowest[i] ? twice_head : lowest[i];
        p[i] = right;
        m[i] = left;
    }
    return well;
}

/* Nodes within the limit after a sweep: it only lessens k|d|, and leaves be what is
 * beyond. */
static inline int64_t kent_kernel_within(size_t n, double limit, const double *k,
                                         const double *p, const double *m)
{
    int64_t within = 0;
    for (size_t i = 0; i < n; i++) {
        within += k[i] * fabs(p[i] - m[i]) <= limit;
    }
    return within;
}

/* Block by block. What a block receives over its edges it must watch as well. */
static inline __attribute__((always_inline)) int64_t
kent_kernel_blocks(size_t n, double limit, int implicit, const double *restrict k,
                   double *restrict p, double *restrict m, double *restrict highest,
                   double *restrict lowest, const kent_floor *restrict floors,
                   uint8_t *restrict low)
{
    int64_t within = 0;
    for (size_t i = 0, block = 0; i < n; i += KENT_BLOCK, block++) {
        const size_t count = n - i < KENT_BLOCK ? n - i : KENT_BLOCK;
        const kent_floor floor = floors[block];
        const int64_t well =
            count == KENT_BLOCK /* a constant makes whole vectors of it */
                ? kent_kernel_body(KENT_BLOCK, limit, implicit, k + i, p + i, m + i,
                                   highest + i, lowest + i, &floor)
                : kent_kernel_body(count, limit, implicit, k + i, p + i, m + i,
                                   highest + i, lowest + i, &floor);
        const bool all = well == (int64_t)count;
        within += all ? well : kent_kernel_within(count, limit, k + i, p + i, m + i);
        low[block] |= !all | (p[(ptrdiff_t)i - 1] < floor.p);
        if (block > 0) low[block - 1] |= m[i] < floors[block - 1].m;
    }
    if (n > 0) {
        const size_t last = (n - 1) / KENT_BLOCK;
        low[last] |= m[n] < floors[last].m;
    }
    return (int64_t)n - within;
}

/* NOLINTEND(readability-function-size) */

#endif
