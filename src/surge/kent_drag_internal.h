/* Friction and spread minor losses of every reach, as the sweep wants them: k. */
#ifndef KENT_DRAG_INTERNAL_H
#define KENT_DRAG_INTERNAL_H

#include "kent_steady.h"
#include "kent_waves_internal.h"

/* Speeds in bins of 1/16 of an octave, from Reynolds number 1 up. */
enum { KENT_DRAG_OCTAVE = 16, KENT_DRAG_BINS = 30 * KENT_DRAG_OCTAVE };

typedef struct kent_drag_span {
    const kent_friction *friction; /* the model's */
    double per_factor;             /* k of a Darcy factor of 1, 1/m: 7.7 */
    double fixed;                  /* k of spread minor losses, 1/m */
    double stiffening;             /* 1 where explicit; 7.11 */
    double speed_per_metre;        /* 1/s: |V| = |p - m| x this, 7.6 */
    double slowest;                /* m/s, of Reynolds number 1: slower counts as it */
    double *factor; /* [KENT_DRAG_BINS + 1] at the bins' edges; 0: not asked for yet */
} kent_drag_span;

typedef struct kent_drag {
    bool follows; /* quasi-steady: k follows the flow */
    kent_drag_span *spans;
    double *factors; /* the spans' tables */
    bool *implicit;  /* [span_count] swept point-implicitly */
    double *swing;   /* [node_total] m, |p - m| at which k was last worked out */
    size_t next_span, next_node; /* of the rotation; next_node counts in its span */
} kent_drag;

/* Chooses explicit or implicit by the steady flow. Fails with KENT_E_INPUT where a
 * reach is too long for either, naming the reaches needed. */
kent_status kent_drag_new(const kent_model *m, const kent_steady *s,
                          const kent_grid *grid, kent_drag **out, kent_error *err);
void kent_drag_free(kent_drag *d);

/* k of the steady state; waves hold it already. */
void kent_drag_start(kent_drag *d, const kent_model *m, const kent_steady *s,
                     kent_waves *w);

/* Quasi-steady: k wherever the flow has moved by more than 1/32 since k was worked out,
 * by a factor interpolated between the edges of its bin; and of a few more nodes in
 * rotation, by the law itself. Does nothing otherwise. */
void kent_drag_refresh(kent_drag *d, kent_waves *w);

#endif
