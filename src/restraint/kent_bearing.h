/* What a face may count on from the ground beside it, by whichever way its soil's
 * bearing is known, and which passive coefficient that value would take. */
#ifndef KENT_BEARING_H
#define KENT_BEARING_H

#include "kent_model.h"

/* Why a soil's bearing cannot be told. */
typedef enum kent_bearing_gap {
    KENT_BEARING_KNOWN,
    KENT_BEARING_NO_DEPTH,    /* it goes with depth, and the depth is not known */
    KENT_BEARING_ABOVE_TABLE, /* shallower than the first row of its table */
    KENT_BEARING_LACKS        /* unit weight, friction angle or cohesion */
} kent_bearing_gap;

/* Where a face stands. */
typedef struct kent_bearing_place {
    double depth;       /* m, ground to its centre; NAN: not known */
    double water_table; /* m below ground; INFINITY: none */
    double water;       /* N/m3, unit weight of ground water */
} kent_bearing_place;

/* Pa: effective vertical stress at a place in soil of a unit weight (N/m3, in place,
 * above and below the water). source 10.20 */
double kent_effective_stress(double unit_weight, const kent_bearing_place *at);

/* Pa, allowable, any factor inside included; 0: none can be relied on; NAN where *gap
 * says why. By depth: straight between rows, below the last row that row's value. fails
 * never. source docs/theory/10-blocks.md, 10.21 .. 10.23 */
double kent_soil_bearing(const kent_soil *soil, const kent_bearing_place *at,
                         kent_bearing_gap *gap);

/* -: coefficient of passive earth pressure at which soil of a cohesion (Pa; NAN: none)
 * gives a bearing (Pa) under an effective vertical stress (Pa, > 0). source 10.24 */
double kent_implied_passive(double bearing, double cohesion, double stress);

/* A larger one is unlikely: it takes a friction angle above 40 degrees. */
#define KENT_PASSIVE_UNLIKELY 4.6

/* N/m3, of soil whose unit weight is not stated: 120 lbf/ft3, as in published tables of
 * bearing by depth. Only doubt is built on it, never resistance. */
#define KENT_UNIT_WEIGHT_ASSUMED 18850.0

/* What a soil's bearing claims at a place. */
typedef struct kent_bearing_claim {
    double bearing;      /* Pa, times the factor inside: what the ground would give */
    double unit_weight;  /* N/m3 of the soil, stated or assumed */
    double stress;       /* Pa, effective */
    double passive;      /* -: kent_implied_passive of these */
    bool weight_assumed; /* KENT_UNIT_WEIGHT_ASSUMED */
} kent_bearing_claim;

/* Returns false where there is nothing to judge: bearing or depth not known, or nil. */
bool kent_bearing_claims(const kent_soil *soil, const kent_bearing_place *at,
                         kent_bearing_claim *out);

#endif
