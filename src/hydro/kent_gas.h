/* A closed volume of gas that keeps p V^n: n = 1 where its heat leaves as fast as it
 * comes, 1.4 where none does, 1.2 in between. */
#ifndef KENT_GAS_H
#define KENT_GAS_H

typedef struct kent_gas {
    double pressure; /* Pa absolute, in ... */
    double volume;   /* m3 */
    double exponent; /* n */
} kent_gas;

typedef struct kent_gas_point {
    double pressure;  /* Pa absolute */
    double by_volume; /* Pa/m3, negative */
} kent_gas_point;

/* Share of its volume below which a gas is taken to be gone; its pressure goes on along
 * the tangent from there, finite and falling for every volume. */
extern const double KENT_GAS_LEAST;

/* The same gas in another volume (m3, any number). source docs/theory 14.5 */
kent_gas_point kent_gas_in(const kent_gas *gas, double volume);

#endif
