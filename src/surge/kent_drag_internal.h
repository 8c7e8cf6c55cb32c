/* Friction and spread minor losses of every reach, as the sweep wants them: k. */
#ifndef KENT_DRAG_INTERNAL_H
#define KENT_DRAG_INTERNAL_H

#include "kent_steady.h"
#include "kent_waves_internal.h"

/* Flows in bins, eight to an octave, from Reynolds number 1e-7 up to 2.6e8. */
enum { KENT_DRAG_OCTAVE = 8, KENT_DRAG_BINS = 51 * KENT_DRAG_OCTAVE };

/* k over one bin: at_nil + slope x place, place 1 .. 9/8 along it; 1/m. at_nil 0: not
 * asked for yet. */
typedef struct kent_drag_line {
    double at_nil, slope;
} kent_drag_line;

typedef struct kent_drag_span {
    const kent_friction *friction; /* the model's */
    double per_factor;             /* k of a Darcy factor of 1, 1/m: 7.7 */
    double fixed;                  /* k of spread minor losses, 1/m */
    double stiffening;             /* 1 where explicit; 7.11 */
    double trim;               /* 1 but for what the table misses at the steady flow */
    double speed_per_metre;    /* 1/s: |V| = |p - m| x this, 7.6 */
    double reynolds_per_metre; /* 1/m: Reynolds number/2000 = |p - m| x this */
    kent_drag_line *line;      /* [KENT_DRAG_BINS] */
} kent_drag_span;

typedef struct kent_drag {
    bool follows; /* quasi-steady, unsteady: k follows the flow */
    kent_drag_span *spans;
    kent_drag_line *lines; /* the spans' tables */
    bool *implicit;        /* [span_count] swept point-implicitly */
} kent_drag;

/* Chooses explicit or implicit by the steady flow. Fails with KENT_E_INPUT where a
 * reach is too long for either, naming the reaches needed. */
kent_status kent_drag_new(const kent_model *m, const kent_steady *s,
                          const kent_grid *grid, kent_drag **out, kent_error *err);
void kent_drag_free(kent_drag *d);

/* k of the steady state. */
void kent_drag_start(kent_drag *d, const kent_model *m, const kent_steady *s,
                     kent_waves *w);

/* Quasi-steady and unsteady: k of every node by its flow now, in a straight line
 * between the edges of its bin. Does nothing otherwise. */
void kent_drag_refresh(kent_drag *d, kent_waves *w);

/* The same of one flow in a span, 2 B Q in m, of either sign: beside a cavity it is not
 * that of the waves. otherwise: where k does not follow the flow. */
double kent_drag_of(const kent_drag *d, size_t span, double gap, double otherwise);

#endif
