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
    KENT_BEARING_LACKS,       /* unit weight, friction angle or cohesion */
    KENT_BEARING_NO_PLANE,    /* so much rubs on the face that Coulomb's plane has no
                                 passive pressure */
    KENT_BEARING_FALLS        /* the ground falls, and no friction angle tells how much
                                 that takes, or it falls as steeply as that */
} kent_bearing_gap;

/* The ways in which a bearing follows from what a soil states. */
typedef enum kent_way {
    KENT_WAY_CONSTANT,
    KENT_WAY_BY_DEPTH,
    KENT_WAY_GRADIENT,
    KENT_WAY_RANKINE, /* a share of the passive pressure */
    KENT_WAY_COULOMB, /* the same with friction on the face */
    KENT_BEARING_WAYS
} kent_way;

/* Where a face stands. */
typedef struct kent_bearing_place {
    double depth;       /* m, ground to its centre; NAN: not known */
    double water_table; /* m below ground; INFINITY: none */
    double water;       /* N/m3, unit weight of ground water */
    double falls; /* rad, that the ground before it falls by; 0: level, or rises */
    double face;  /* m, height of the tallest face there; 0: its centre counts */
} kent_bearing_place;

/* Pa: effective vertical stress at a place in soil of a unit weight (N/m3, in place,
 * above and below the water). source 10.20 */
double kent_effective_stress(double unit_weight, const kent_bearing_place *at);

/* Pa: the same, as the mean over a face that the water table cuts. source 21.6 */
double kent_mean_stress(double unit_weight, const kent_bearing_place *at);

/* The way that decides for a soil. */
kent_way kent_soil_way(const kent_soil *soil);

/* Whether a soil states what a bearing is told from in that way. */
bool kent_soil_states(const kent_soil *soil, kent_way way);

/* Pa, allowable, by the way that decides, any factor inside included; 0: none can be
 * relied on; NAN where *gap says why. By depth: straight between rows, below the last
 * row that row's value. fails never. source docs/theory/10-blocks.md, 10.21 .. 10.23 */
double kent_soil_bearing(const kent_soil *soil, const kent_bearing_place *at,
                         kent_bearing_gap *gap);

/* Pa: the same by any way that the soil states. */
double kent_way_bearing(const kent_soil *soil, kent_way way,
                        const kent_bearing_place *at, kent_bearing_gap *gap);

/* -: coefficient of passive pressure square to a face by Rankine or Coulomb, with the
 * ground's fall. NAN: not known. source 10.18, 21.2 */
double kent_way_passive(const kent_soil *soil, kent_way way, double falls);

/* -: what falling ground leaves of a bearing that is not worked out from earth
 * pressure; 1 on level ground; NAN: no friction angle tells. source 21.7 */
double kent_falling_share(const kent_soil *soil, double falls);

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

/* The same of a bearing (Pa) told in some way. */
bool kent_bearing_claims_of(const kent_soil *soil, double bearing,
                            const kent_bearing_place *at, kent_bearing_claim *out);

#endif
