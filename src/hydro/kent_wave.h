/* Speed of a pressure wave in a pipe full of water. */
#ifndef KENT_WAVE_H
#define KENT_WAVE_H

#include <stdbool.h>

typedef enum kent_axial_support {
    KENT_FLEXIBLE_JOINTS, /* free to move at every joint */
    KENT_FIXED_UPSTREAM,  /* anchored at its upstream end only */
    KENT_FIXED_THROUGHOUT
} kent_axial_support;

typedef struct kent_wall {
    double bore;           /* m, inside the lining */
    double thickness;      /* m, of the structural wall */
    double modulus;        /* Pa; INFINITY: rigid */
    double poisson;        /* - */
    double lining;         /* m, thickness of the lining, 0: none */
    double lining_modulus; /* Pa */
} kent_wall;

/* c1 of a = sqrt(K/rho) / sqrt(1 + c1 K D/(E e)): the support's factor. thin: the
 * thin-wall form, else the thick-wall one. D is wall->bore, e the equivalent thickness.
 */
double kent_wave_support_factor(const kent_wall *wall, kent_axial_support support,
                                bool thin);

/* m, wall and lining as one wall of the structural material: e + lining E_l/E. */
double kent_wave_equivalent_thickness(const kent_wall *wall);

typedef struct kent_mixture { /* of water and free gas, at one pressure */
    double gas_share;         /* -, gas by volume */
    double density;           /* kg/m3 */
    double bulk_modulus;      /* Pa */
} kent_mixture;

/* Water of a density (kg/m3) and bulk modulus (Pa) with free gas: gas_content, by
 * volume at one atmosphere (0 .. 0.05; 0: none), at a pressure (Pa absolute, > 0).
 * Isothermal. fails: never, NaN in gives NaN out. source
 * docs/theory/02-wave-speed.md, 2.6 .. 2.8 */
kent_mixture kent_wave_mixture(double density, double bulk_modulus, double gas_content,
                               double pressure);

/* m/s. density kg/m3, bulk_modulus Pa. fails: never, NaN in gives NaN out. */
double kent_wave_speed(const kent_wall *wall, kent_axial_support support, bool thin,
                       double density, double bulk_modulus);

#endif
