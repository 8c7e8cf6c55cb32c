/* The one-way valve behind a pump or in line: 13.13 to 13.15.
 *
 * While it lets water one way only, flow q >= 0 and what the water has to spare against
 * it, gap >= 0, one of them nil, is written as the smaller of Z q and the gap being
 * nil: one equation that rises with q, so that whoever searches for the flow finds
 * whether it is open too. A delayed one that has not shut yet lets water both ways;
 * that it shuts is decided between steps. */
#ifndef KENT_FLAP_INTERNAL_H
#define KENT_FLAP_INTERNAL_H

#include "kent_model.h"

typedef struct kent_flap {
    kent_check_kind kind;
    bool shut;      /* of a delayed one: nothing comes back */
    bool near;      /* of a delayed one: open, but not for as long as its delay */
    double delay;   /* s from the first reversal to closure */
    double since;   /* s, when the flow reversed; NAN: it has not */
    double opened;  /* s, when it last opened; -INFINITY: it was open at the start */
    double stopped; /* m3/s: the greatest reverse flow that a closure has stopped */
} kent_flap;

/* What the search sees of a flow's law, and how it changes with the flow. */
typedef struct kent_flap_gap {
    double value, slope;
    bool shut; /* it is the flow that must be nil */
} kent_flap_gap;

/* flow: m3/s in the steady state. A delay of nil is an ideal one. */
kent_flap kent_flap_new(kent_check_kind kind, double delay, double flow);

/* To the step that ends at time (s); flow m3/s at its start. True where it shuts. */
bool kent_flap_move(kent_flap *f, double time, double flow);

/* Whether it lets water one way only in this step. */
bool kent_flap_is_one_way(const kent_flap *f);

/* One that is one-way: gap and slope (m, s/m2) at the flow q, or at nil where q is
 * below; z s/m2, about the impedance of a pipe of its size. */
kent_flap_gap kent_flap_law(double q, double gap, double slope, double z);

/* flow: m3/s before and at the end of the step that ends at time (s). */
void kent_flap_settle(kent_flap *f, double before, double flow, double time,
                      double step);

#endif
