/* Friction that remembers: how past changes of speed still pull at the wall.
 *
 * Time is dimensionless, tau = 4 nu t/D^2. The friction slope is that of the steady
 * flow and (16 nu/(g D^2)) int W(tau) dV (16.1). For marching W is a sum of fading
 * exponentials, whose state is one number each and knows all of the past. */
#ifndef KENT_WEIGHTING_H
#define KENT_WEIGHTING_H

#include <stddef.h>

/* Zielke's W of laminar flow, by his two published sets of coefficients, that meet at
 * tau = 0.02. tau > 0. source docs/theory/16-memory.md, 16.2, 16.3 */
double kent_zielke_weight(double tau);

/* Trikha's three exponentials in place of it, for comparison: up to 38 % off. 16.12 */
double kent_trikha_weight(double tau);

/* W of turbulent flow (Vardy and Brown): e^(-tau/C)/(2 sqrt(pi tau)), C from below.
 * tau > 0. 16.4 */
double kent_turbulent_weight(double tau, double shear_decay);

/* Vardy and Brown's shear decay coefficient C* of turbulent flow in a smooth pipe, -.
 * Theirs of 2003, which marching uses, and of 1995/96, which is 1.7 to 2 times smaller
 * (16.5, 16.6). reynolds > 0. */
double kent_shear_decay(double reynolds);
double kent_shear_decay_1996(double reynolds);

/* C* of laminar flow: 16.7. */
extern const double KENT_LAMINAR_SHEAR_DECAY;

enum { KENT_FADES = 40 };

/* W(tau) = sum weight exp(-rate tau), and at_once: the integral of what is over within
 * one step. */
typedef struct kent_weighting {
    size_t count;
    double rate[KENT_FADES], weight[KENT_FADES]; /* - */
    double at_once;                              /* - */
} kent_weighting;

/* W as a sum, for steps of `step` (dimensionless, 1e-12 .. 1e3) and longer: within 0.5
 * % of W from tau = step until W is a thousandth of what it was at tau = C* (16.8 ..
 * 16.11). Zielke's up to Reynolds number 2000, turbulent above, with a C* no greater
 * than the laminar one. Every weight is positive, so that it can only take energy out
 * of the water. fails: never. */
kent_weighting kent_weighting_sum(double reynolds, double step);

#endif
