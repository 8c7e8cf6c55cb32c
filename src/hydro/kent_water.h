/* Water: properties at one temperature and 0.1 MPa. */
#ifndef KENT_WATER_H
#define KENT_WATER_H

typedef struct kent_water {
    double temperature;     /* K */
    double density;         /* kg/m3 */
    double bulk_modulus;    /* Pa, adiabatic: density x sound speed squared */
    double viscosity;       /* Pa s, dynamic */
    double vapour_pressure; /* Pa, absolute */
    double sound_speed;     /* m/s, unconfined */
} kent_water;

/* Lowest and highest temperature of the formulas, K (0 .. 100 degC). */
extern const double KENT_WATER_COLDEST, KENT_WATER_HOTTEST;

/* units K; range KENT_WATER_COLDEST .. KENT_WATER_HOTTEST; outside: every field NaN.
 * source IAPWS SR6-08 (density, sound speed, viscosity at 0.1 MPa), IAPWS R7-97
 * region 4. */
kent_water kent_water_at(double temperature);

/* Barometric pressure, Pa absolute, at altitude m (-500 .. 11000). source ISO 2533. */
double kent_barometric_pressure(double altitude);

/* Piezometric head (m above datum) at which water at level z (m) starts to boil.
 * gravity m/s2, barometric Pa absolute. source docs/theory. */
double kent_vapour_head(const kent_water *water, double z, double barometric,
                        double gravity);

#endif
