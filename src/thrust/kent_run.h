/* Straight runs above ground: how the water pushes a whole run along its axis, at every
 * instant of every march. No ground bears there: its anchors and guides take it.
 *
 * A run lies between two places where the main turns, or where its span ends; between
 * them the wall has one direction and one bore. */
#ifndef KENT_RUN_H
#define KENT_RUN_H

#include "kent_model.h"

/* N, along the axis of a run of water, from its start (0) to its end (1): what head and
 * flow at both ends leave out of balance with the drag on the wall between. In steady
 * flow nil; while the flow changes, the reaction of the water that it slows.
 *
 * units    area m2, head m (piezometric), flow m3/s (positive towards the end), loss m
 *          (of head over the run at each end's flow, sign of the flow), density kg/m3
 * sign     positive towards the end
 * fails    never; a non-finite input gives a non-finite result
 * source   docs/theory/24-runs.md, 24.1 .. 24.3 */
typedef struct kent_run_state {
    double head[2], flow[2], momentum_factor[2], loss[2];
} kent_run_state;
double kent_run_force(double area, double density, double gravity,
                      const kent_run_state *at);

/* Most instants kept of one run in one march: each the largest force of its share of
 * the march's duration, either sign. */
enum { KENT_RUN_ROWS = 240 };

typedef struct kent_run_moment {
    double time, force; /* s, N */
} kent_run_moment;

typedef struct kent_run_march { /* of one march; not `set`: it was not run */
    bool set;
    kent_run_moment lowest, highest; /* the most either way; nil at most and at least */
    kent_run_moment *history;        /* [history_count] by time */
    size_t history_count;
} kent_run_march;

typedef struct kent_run {
    int span, from, to;      /* points */
    double start, end;       /* m from the span's start */
    double length, area;     /* m along the pipe, m2 of bore */
    double rise;             /* m from `from` up to `to` */
    kent_vec3 axis;          /* unit, from -> to; NAN without coordinates */
    double water_weight;     /* N, its part along the axis: positive towards `to` */
    double pipe_weight;      /* N, the same of the empty pipe; NAN: mass not known */
    bool slips;              /* its joints can slip: each pipe is anchored by itself */
    kent_run_march *marches; /* [march_count], the model's */
    size_t march_count;
} kent_run;

/* The runs of all pipes above ground, by span and chainage, without marches; *out is
 * the caller's to free with kent_runs_free. */
kent_status kent_runs_find(const kent_model *m, kent_run **out, size_t *count,
                           kent_error *err);
void kent_runs_free(kent_run *runs, size_t count);

/* N: the most that the run's anchors take either way, over all marches that decide (not
 * those for comparison); without marches nil. march: which it was; -1: none. */
typedef struct kent_run_worst {
    double force, time;
    int march;
} kent_run_worst;
kent_run_worst kent_run_most(const kent_model *m, const kent_run *run, bool forward);

#endif
