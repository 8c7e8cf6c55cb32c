/* Everything of thrust/. */
#ifndef KENT_THRUST_H
#define KENT_THRUST_H

#include "kent_balance.h"
#include "kent_loads.h"

#endif
