/* Heads and flows at t = 0, with a report of how the solver stopped. */
#ifndef KENT_STEADY_H
#define KENT_STEADY_H

#include "kent_model.h"

typedef enum kent_stop {
    KENT_STOP_CONVERGED,
    KENT_STOP_STALLED, /* the line search found no better point */
    KENT_STOP_LIMIT,   /* too many iterations */
    KENT_STOP_SINGULAR /* the equations have no single answer */
} kent_stop;

typedef struct kent_steady_report {
    kent_stop stop;
    int iterations;
    double worst_imbalance; /* m3/s, largest net inflow at a node */
    int worst_node;         /* where; -1: no free node */
    double worst_head_gap;  /* m, largest head equation left open */
    int worst_span;         /* where; -1: at a device, or no span */
} kent_steady_report;

typedef struct kent_steady {
    const kent_model *model; /* what it was found for: outlives it */
    kent_model *view;        /* the same where it is a state's own view; else NULL */
    double *node_head;      /* [node_count] m, piezometric; at a fixed level that of the
                               pipe just inside: less (1 + loss) V2/2g of what flows out */
    double *span_flow;      /* [span_count] m3/s, positive from node[0] to node[1] */
    double *valve_flow;     /* [valve_count] m3/s, positive from node[0] */
    double *valve_capacity; /* [valve_count] m^2.5/s at full opening; found where the
                               case gives the flow instead */
    double *outflow;        /* [outflow_count] m3/s drawn */
    double *device_flow;    /* [device_count] m3/s, as kent_device says; all units of a
                               pump together; 0 of what is shut or at rest */
    kent_steady_report report;
} kent_steady;

/* Solves continuity at nodes and energy along spans and valves (docs/theory). Fails
 * with KENT_E_SOLVE, err->what naming why it stopped, the worst imbalance and its
 * point; or KENT_E_INPUT where the case itself is impossible (a valve's stated flow
 * runs uphill). */
kent_status kent_steady_solve(const kent_model *m, kent_steady **out, kent_error *err);
void kent_steady_free(kent_steady *s);
void kent_steady_free_states(kent_steady **s, size_t count); /* and the list itself */

/* Every state of m into out [state_count], in order; each owns its view of m. What a
 * valve with a stated flow was found to pass in the first one it passes in all. Fails
 * as above, saying in which state where there are several; out then holds those found
 * before, and NULL from there on. */
kent_status kent_steady_solve_states(const kent_model *m, kent_steady **out,
                                     kent_error *err);

/* What a pump does in the steady state, all units that run together. */
typedef struct kent_pump_duty {
    int running;
    double flow;   /* m3/s, through it in all */
    double of_one; /* m3/s, through each that runs; 0: none does */
    double lift;   /* m, from suction (level) to delivery, behind its check valve */
    double power;  /* W at the shafts */
} kent_pump_duty;

/* device: index of a pump into kent_model.devices. */
kent_pump_duty kent_steady_pump(const kent_steady *s, size_t device);

/* m: piezometric head at a chainage of a span; a straight line between its ends. */
double kent_steady_head(const kent_model *m, const kent_steady *s, int span,
                        double chainage);

#endif
