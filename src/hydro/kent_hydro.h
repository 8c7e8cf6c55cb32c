/* Everything of hydro/: laws without state. */
#ifndef KENT_HYDRO_H
#define KENT_HYDRO_H

#include "kent_air.h"
#include "kent_friction.h"
#include "kent_gas.h"
#include "kent_profile.h"
#include "kent_pump.h"
#include "kent_ring.h"
#include "kent_screening.h"
#include "kent_valve.h"
#include "kent_water.h"
#include "kent_wave.h"
#include "kent_weighting.h"

#endif
