/* Where spans end: from the waves that arrive at a node to the waves that leave it.
 *
 * Seen from a node every span looks alike: with c the wave arriving from it, the flow
 * into the node is (c - H)/B, and the wave sent back is 2H - c (7.12, 7.13). Summed
 * over a node's tips, with Y = sum 1/B: inflow = Y (C - H), C = sum (1/B) c / Y. So an
 * end needs one number, H, from C, Y and what stands there.
 *
 * Knots lie sorted by kind, then by number of tips; a run is a stretch alike in both.
 * A new kind is one function and one row of KINDS in kent_ends.c. */
#ifndef KENT_ENDS_INTERNAL_H
#define KENT_ENDS_INTERNAL_H

#include "kent_schedule_internal.h"
#include "kent_steady.h"
#include "kent_waves_internal.h"

typedef enum kent_end_kind {
    KENT_END_DEAD,        /* one tip, nothing else */
    KENT_END_JUNCTION,    /* two or more tips */
    KENT_END_FIXED_LEVEL, /* a level; what flows out of it loses (1 + loss) V2/2g */
    KENT_END_OUTFLOW,     /* draws a flow */
    KENT_END_DISCHARGE,   /* a valve into a constant level */
    KENT_END_VALVE,       /* a valve in line: two knots, one after the other */
    KENT_END_CLUSTER,     /* devices, and all that stands in one place with them: the
                             clusters' knots, one cluster after the other */
    KENT_END_KINDS
} kent_end_kind;

typedef struct kent_tip { /* one span's end */
    uint32_t node;        /* place in the waves' arrays */
    uint32_t side;        /* 0: the span's start, where m arrives; 1: its end */
    double weight;        /* (1/B)/Y */
} kent_tip;

typedef struct kent_knot {
    size_t tip_first, tip_count;
    double admittance; /* Y = sum 1/B, m2/s */
    int device;        /* into levels, draws or gates; -1 */
    int node;          /* the model's */
} kent_knot;

typedef struct kent_run {
    kent_end_kind kind;
    size_t first, count; /* knots */
    size_t tip_count;    /* of each knot */
} kent_run;

typedef struct kent_level { /* by the model's index, like draws and gates */
    double level;           /* m */
    double loss;            /* s2/m5: (1 + loss)/(2 g A2) */
} kent_level;

typedef struct kent_draw {
    double flow; /* m3/s wanted now */
    double z;    /* m, level at which pressure is nil */
    double full; /* m above z from which the whole flow is drawn; 0: no dependence */
} kent_draw;

typedef struct kent_gate {
    double capacity;         /* m^2.5/s, now */
    double level;            /* m, where it discharges */
    double full_capacity;    /* m^2.5/s */
    const kent_valve *valve; /* the model's */
} kent_gate;

typedef struct kent_stands kent_stands; /* kent_stands_internal.h */

typedef struct kent_ends {
    kent_tip *tips;
    kent_knot *knots;
    double
        *head; /* [knot_count] m: of the instant solved last, but those of clusters */
    kent_run *runs;
    size_t tip_count, knot_count, run_count;
    kent_level *levels;
    kent_draw *draws;
    kent_gate *gates;
    kent_stands *stands;
} kent_ends;

/* scenario: which devices it leaves out; -1: none. */
kent_status kent_ends_new(const kent_model *m, const kent_steady *s,
                          const kent_waves *w, int scenario, kent_ends **out,
                          kent_error *err);
void kent_ends_free(kent_ends *e);

/* Sets all that stands at nodes to what it is at the end of a step: time, step in s. */
void kent_ends_move(kent_ends *e, const kent_schedule *schedule, double time,
                    double step);

/* Writes the wave that leaves every end. Whether a device stops the march is in
 * e->stands->stopped. */
void kent_ends_solve(const kent_ends *e, kent_waves *w);

/* m: C of the waves that arrive at a knot; and a head sent back along all its spans. */
double kent_knot_arriving(const kent_ends *e, const kent_knot *knot,
                          const kent_waves *w);
void kent_knot_send_back(const kent_ends *e, const kent_knot *knot, double head,
                         const kent_waves *w);

/* What stands at a node, alone: tested with six numbers each. C m, Y m2/s; head m. */
double kent_level_head(const kent_level *level, double c, double y);
double kent_draw_head(const kent_draw *draw, double c, double y);
/* m3/s through a valve: difference of C (m) and sum of 1/Y (s/m2) over its sides. */
double kent_gate_flow(double capacity, double c, double inverse_y);

#endif
