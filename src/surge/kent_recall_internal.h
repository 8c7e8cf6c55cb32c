/* What water and wall remember: friction of past accelerations, creep of plastic walls.
 *
 * Nothing of it is there, and nothing costs, unless solver.friction is unsteady or
 * solver.creep is on and a pipe has elements. In the steady state both are nil to the
 * last bit: nothing accelerates, and the walls have crept as far as they will. */
#ifndef KENT_RECALL_INTERNAL_H
#define KENT_RECALL_INTERNAL_H

#include "kent_steady.h"
#include "kent_waves_internal.h"

typedef struct kent_recall {
    kent_fade *pulls, *walls; /* of the spans that have them */
    size_t pull_count, wall_count;
    double *terms; /* fade and gain of all of them */
    double *pool;  /* v, sum and past of all of them */
} kent_recall;

/* m/s: a span slower in the steady state remembers as one of KENT_RECALL_AT_REST does:
 * what moves it is the surge. No source. */
extern const double KENT_RECALL_SLOW, KENT_RECALL_AT_REST;

/* *out NULL where there is nothing to remember. Takes terms + 2 numbers a node and
 * span. Fails with KENT_E_INPUT where a pipe creeps of whose wall too little is known.
 */
kent_status kent_recall_new(const kent_model *m, const kent_steady *s,
                            const kent_grid *grid, const kent_waves *w,
                            kent_recall **out, kent_error *err);
void kent_recall_free(kent_recall *r);

/* Takes what w holds as the state that all has been in for ever. */
void kent_recall_start(kent_recall *r, const kent_waves *w);

/* Friction of the past, before the sweep, which then sees the flow that it leaves. r
 * may be NULL here and below. */
void kent_recall_pull(const kent_recall *r, const kent_kernel *kernel, kent_waves *w);

/* Walls, after the sweep, whose envelopes want the heads as they arrived. */
void kent_recall_yield(const kent_recall *r, const kent_kernel *kernel, kent_waves *w);

/* How far a pipe's wall gives way late, of 1/Pa compliance: a^2 rho c1 D/e (16.22),
 * with the wave speed used (m/s). NAN where wall or Poisson's ratio are not known. */
double kent_recall_softness(const kent_model *m, const kent_span *span,
                            double wave_speed);

#endif
