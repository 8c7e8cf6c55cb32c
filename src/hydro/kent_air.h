/* Air through an orifice, either way, at the speed of sound or below it.
 *
 * Without friction and without heat on the way, from rest on the side of the higher
 * pressure; the air inside is as warm as the air outside. */
#ifndef KENT_AIR_H
#define KENT_AIR_H

/* J/(kg K). source ISO 2533 */
extern const double KENT_AIR_GAS_CONSTANT;

/* An opening to air at rest at a pressure (Pa absolute) and temperature (K). Areas
 * are times the coefficient of discharge, m2. */
typedef struct kent_orifice {
    double in, out;     /* area for what comes in, for what goes out */
    double outside;     /* Pa absolute */
    double temperature; /* K, on both sides */
} kent_orifice;

typedef struct kent_air_rate {
    double mass;        /* kg/s, positive inwards */
    double by_pressure; /* kg/(s Pa), never positive */
} kent_air_rate;

/* inside: Pa absolute, > 0. Within 1/10 000 of the pressure outside the rate is a
 * straight line through nil, so that its slope is finite. source docs/theory 14.12 */
kent_air_rate kent_air_through(const kent_orifice *orifice, double inside);

#endif
