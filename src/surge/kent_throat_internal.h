/* The connection between a main and what stands beside it: it loses K V2/2g on its own
 * bore, with a K for each direction. */
#ifndef KENT_THROAT_INTERNAL_H
#define KENT_THROAT_INTERNAL_H

#include "kent_device_internal.h"

typedef struct kent_throat {
    double out_of_main, into_main; /* s2/m5: K/(2 g A2) */
} kent_throat;

/* bore m; K on it, - */
kent_throat kent_throat_of(double bore, double k_out_of_main, double k_into_main,
                           double gravity);

/* What a store of water asks of the head (m) of the main: f = its own head + the loss -
 * that of the main. own: m, and own_by_flow its derivative, s/m2. 14.2 */
kent_device_law kent_throat_law(const kent_throat *throat, double flow, double own,
                                double own_by_flow, double main);

#endif
