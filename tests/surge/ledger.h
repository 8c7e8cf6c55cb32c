/* Where the water of a march is, and where it went: what the tests that weigh it share.
 */
#ifndef LEDGER_H
#define LEDGER_H

#include "kent_marcher.h"

/* m3 over those at head nil that a span of n reaches holds by its elasticity: 7.20. b:
 * s/m2, its impedance; step: s; head, flow: [n + 1] as kent_marcher_profile writes
 * them, where no cavity parts the flows. */
double ledger_held(size_t n, double b, double step, const double *head,
                   const double *flow);
/* s/m2 */
double ledger_impedance(const kent_model *m, const kent_grid *grid, size_t span);

/* m3: what a device says it holds or has let go, of flow that it took in. NAN: says
 * nothing of the kind. */
double ledger_taken(const kent_model *m, const kent_device *d, const double *told);
/* m3 that it took in over a step, of its flows (m3/s) before and after it. */
double ledger_flowed(const kent_device *d, double before, double after, double step);

/* m3/s that arrives at a node by its pipes and is not taken by its devices. flow:
 * m3/s at both ends of every span, in order. */
double ledger_left_over(const kent_model *m, int node, const double (*flow)[2],
                        const kent_device_row *devices);

#endif
