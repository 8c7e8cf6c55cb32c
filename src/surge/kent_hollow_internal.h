/* What the water leaves free at one place where it comes apart: gas, or vapour.
 *
 * The place is a grid point or a node. C is the mean of the waves that arrive there and
 * Y the sum of 1/B, so that water flows in at Y (C - H) (7.12). Whatever does not flow
 * off again makes the hollow smaller. Over a step dt, all flows taken at its end
 * (psi = 1), with r = H - limit and rest = C - limit:
 *
 *     volume' = volume + dt Y (r - rest),     volume' r = gas                  (15.5)
 *
 * One quadratic in r with one root that is positive. Without gas (gas = 0) the same
 * root is the vapour cavity: r = 0 while there is volume left, and volume' = 0 exactly
 * when it closes. */
#ifndef KENT_HOLLOW_INTERNAL_H
#define KENT_HOLLOW_INTERNAL_H

#include <math.h>

typedef struct kent_hollow { /* of a node */
    double limit;            /* m; -INFINITY: it never boils there */
    double room;             /* m2: dt Y */
    double per_flow;         /* s/m2: 1/Y */
    double gas;              /* m4; 0: vapour alone */
    double volume;           /* m3, at the instant before */
} kent_hollow;

typedef struct kent_hollow_end { /* of a step */
    double rise;                 /* m: head above the limit, not negative */
    double volume;               /* m3, not negative */
    double slope;                /* d rise/d rest, 0 .. 1 */
} kent_hollow_end;

/* rest: m; volume: m3, before the step; room: m2, dt Y; gas: m4. docs/theory 15.6.
 * Neither root subtracts what is nearly equal. */
static inline kent_hollow_end kent_hollow_step(double rest, double volume, double room,
                                               double gas)
{
    const double b = volume - room * rest;
    const double root = sqrt(b * b + 4.0 * room * gas);
    const double sum = fabs(b) + root;
    if (b > 0.0) {
        const double rise = 2.0 * gas / sum;
        return (kent_hollow_end){rise, 0.5 * sum, room * rise / root};
    }
    const double rise = sum / (2.0 * room);
    return (kent_hollow_end){rise, sum > 0.0 ? 2.0 * room * gas / sum : 0.0,
                             root > 0.0 ? room * rise / root : 1.0};
}

/* One side of what is solved together: a node with a hollow, or a head that stands. */
typedef struct kent_hollow_side {
    const kent_hollow *hollow; /* NULL: the head is c, whatever is taken */
    double c, y;               /* m, m2/s */
} kent_hollow_side;

/* m, once taken (m3/s) leaves otherwise than through spans. */
double kent_hollow_head(const kent_hollow_side *side, double taken, double *by_taken);

/* m3/s through a valve of that capacity (m^2.5/s), positive from side 0 to side 1: 7.18
 * with the heads of hollows. */
double kent_hollow_gate(double capacity, const kent_hollow_side side[2]);

/* m3/s that an outflow draws at a hollow: 7.16, 7.17. flow m3/s wanted, z m where
 * pressure is nil, full m above it from which the whole flow is drawn; 0: at any. */
double kent_hollow_draw(double flow, double z, double full,
                        const kent_hollow_side *side);

#endif
