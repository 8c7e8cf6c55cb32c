/* Which law each outflow obeys: it draws all, part or none of its flow as the pressure
 * there allows. (6.8), (6.9) */
#ifndef KENT_OUTLET_INTERNAL_H
#define KENT_OUTLET_INTERNAL_H

#include "kent_equations_internal.h"

/* Puts an outflow whose law a solution x contradicts under another one; whether it was.
 */
bool kent_outlet_switch(kent_equations *eq, const double *x, size_t outflow);

/* Lets an outflow that draws all or nothing draw what the pressure allows; false: it
 * does so already, or flows in. */
bool kent_outlet_loosen(kent_equations *eq, size_t outflow);

#endif
