/* Whether a block stays where it is put: eccentricity, sliding, overturning, pressure
 * under its base, flotation of it and the main it carries. Thrusts are unfactored here,
 * each load case with the factor that is asked of it.
 *
 * source docs/theory/20-stability.md */
#ifndef KENT_STABILITY_H
#define KENT_STABILITY_H

#include "kent_loads.h"

/* ---- plain functions ------------------------------------------------------------- */

/* -: what resists sliding over what drives it; passive, active, friction, thrust all N
 * (or all N/m). INFINITY where nothing drives. source 20.6 */
double kent_sliding_factor(double passive, double active, double friction,
                           double thrust);

/* N of friction under a base that presses with normal (N): coefficient times it, or
 * where the cohesion (Pa) is stated that on the pressed area (m2), at most half of
 * normal. NAN, neither known: 0. source 20.5 */
double kent_base_friction(double normal, double coefficient, double cohesion,
                          double area);

/* -: moment (N m) that steadies over moment that topples. INFINITY where none topples.
 * source 20.8 */
double kent_overturning_factor(double steadies, double topples);

typedef struct kent_base_pressure {
    double eccentricity; /* m, of the resultant from the middle, to the front */
    double pressed;      /* m of the length that presses on the ground */
    double largest;      /* Pa at the edge; INFINITY: the resultant leaves the base */
    double least;        /* Pa at the other; 0 where it lifts */
    bool outside_third;  /* a triangle: part of the base lifts */
} kent_base_pressure;

/* Under a base length x breadth (m) that presses with normal (N, > 0) and moment (N m)
 * about its middle. source 20.9, 20.10 */
kent_base_pressure kent_base_pressure_of(double normal, double moment, double length,
                                         double breadth);

/* -: weight (N, in air) over that of the water displaced (m3, N/m3). INFINITY where
 * none is. source 20.11 */
double kent_flotation_factor(double weight, double displaced, double water);

/* N: soil straight above a plan (m2) down to a depth (m), with no shear on its sides,
 * buoyed below the water table (m; INFINITY). source 20.4 */
double kent_soil_prism(double plan, double depth, double unit_weight,
                       double water_table, double water);

/* ---- a block --------------------------------------------------------------------- */

typedef enum kent_hour { KENT_AT_WORK, KENT_AT_TEST, KENT_HOURS } kent_hour;

/* The least factor reached of its kind, by the case that leaves least of it. */
typedef struct kent_stand {
    double reached;   /* NAN: nothing of this kind pushes, or no case of this hour */
    double asked;     /* 0: not asked */
    int load_case;    /* index into the fitting's; -1 */
    kent_sense sense; /* whose worst instant it is */
} kent_stand;

typedef struct kent_stability {
    bool judged;         /* there is a block */
    bool stands;         /* it reaches every factor that is asked of it */
    double eccentricity; /* m, pipe axis above the centre of the face; 0 as designed */
    double moment;       /* N m that it makes of the largest sideways thrust */
    double weight;       /* N, of the concrete, less the water's, with soil_above */
    double soil_above;   /* N of that; 0: not counted */
    kent_stand sliding[KENT_HOURS], overturning[KENT_HOURS];
    kent_stand pressure[KENT_HOURS]; /* bearing under the base over the largest */
    kent_base_pressure base[KENT_HOURS];
    bool friction_known;    /* base_friction or base_cohesion is stated */
    bool bearing_known;     /* under a base */
    double flotation[2];    /* factor, main empty and full; NAN: no ground water */
    double flotation_asked; /* 0: not asked */
    double displaced;       /* m3 of water, by block and pipe */
    double pipe_length;     /* m of main counted with the block: its own length */
    bool pipe_weight_known; /* else the pipe counts as weighing nothing */
} kent_stability;

#endif
