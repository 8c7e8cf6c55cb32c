/* Which law each outflow obeys: it draws all, part or none of its flow as the pressure
 * there allows. (6.8), (6.9) */
#ifndef KENT_OUTLET_INTERNAL_H
#define KENT_OUTLET_INTERNAL_H

#include "kent_equations_internal.h"

/* Looks at a solution x and puts outflows whose law it contradicts under another one.
 * one: the first such outflow only. Returns how many changed; 0: x holds. */
size_t kent_outlet_switch(kent_equations *eq, const double *x, bool one);

#endif
