/* Everything of surge/. */
#ifndef KENT_SURGE_H
#define KENT_SURGE_H

#include "kent_grid.h"
#include "kent_marcher.h"

#endif
