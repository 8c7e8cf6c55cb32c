/* What lets water pass other than along a span: a valve, an outflow, a device. Each has
 * one flow and one law at a time (docs/theory/06-steady.md); who changes laws is
 * kent_outlet and kent_duty. */
#ifndef KENT_LINK_INTERNAL_H
#define KENT_LINK_INTERNAL_H

#include "kent_model.h"

typedef enum kent_link_law {
    KENT_LINK_FLOW,  /* passes a given flow                          (6.7) */
    KENT_LINK_HEAD,  /* holds a head at one side, passes what that takes (6.9, 6.16) */
    KENT_LINK_LOSS,  /* loses resistance q|q|                        (6.6) */
    KENT_LINK_PUMP,  /* lifts by its curve                           (6.14) */
    KENT_LINK_RELIEF /* opens as the head before it rises            (6.17) */
} kent_link_law;

typedef struct kent_link {
    kent_link_law law;
    int node[2];       /* flow positive from [0] to [1]; -1: outside the main */
    int held;          /* side whose head KENT_LINK_HEAD holds */
    double flow;       /* m3/s, of KENT_LINK_FLOW */
    double level;      /* m, of KENT_LINK_HEAD; of what is outside the main */
    double resistance; /* s2/m5, of KENT_LINK_LOSS; of one unit's check valve */
    const kent_pump_curve *curve; /* of KENT_LINK_PUMP */
    double units, speed;          /* side by side; rad/s */
    double set, full;             /* m of head, between which KENT_LINK_RELIEF opens */
    double capacity;              /* m^2.5/s, of KENT_LINK_RELIEF fully open */
} kent_link;

/* As the case states them: valves given by `flow` pass it; outflows draw their whole
 * flow, pressure-dependent ones as an orifice would. */
kent_link kent_link_of_valve(const kent_valve *v);
kent_link kent_link_of_outflow(const kent_model *m, const kent_outflow *o);

/* m3/s, where a search starts; scale: of a link without a flow of its own. */
double kent_link_start(const kent_link *link, double scale);

/* h: heads of nodes, m; q: the link's flow, m3/s. m, or m3/s where is_flow. */
double kent_link_residual(const kent_link *link, const double *h, double q);
bool kent_link_is_flow(const kent_link *link);

/* Derivatives by the head before, the head behind and the flow. */
void kent_link_derivatives(const kent_link *link, const double *h, double q,
                           double value[3]);

/* m gained from suction to delivery by a pump that passes q in all. */
double kent_link_lift(const kent_link *link, double q);

#endif
