#include "kent_weighting.h"

#include "kent_math.h"

#include <math.h>
#include <stdbool.h>

static const double PI = 3.14159265358979323846;

/* Squares of the zeros of the Bessel function J2, as published: 16.2. */
enum { MODES = 5 };
static const double MODE[MODES] = {26.3744, 70.8493, 135.0198, 218.9216, 322.5544};
/* Square root of where mode 6 and all faster ones begin: half way between the zeros
 * 17.9598 and 21.1170. */
static const double FAST_FROM = 19.5384;
/* tau where the published series of slow modes and that of fast ones meet. */
static const double MEET = 0.02;
/* Darcy's laminar friction ends here. */
static const double LAMINAR_UP_TO = 2000.0;
/* rate x step beyond which a term is over within a step: e^-7 is 1/1100. */
static const double OVER = 7.0;
/* Where the sum over the fast modes starts, and its ratio from term to term: 16.9. */
static const double FIRST = 0.4, RATIO = 2.0;
/* Terms are added up in kent_weighting.at_once until they are this many steps' worth.
 */
enum { SETTLED = 60 };

const double KENT_LAMINAR_SHEAR_DECAY = 0.00476;

/* 16.2, 16.3 */
double kent_zielke_weight(double tau)
{
    static const double early[] = {0.282095, -1.25,    1.057855,
                                   0.9375,   0.396696, -0.351563};
    const double root = sqrt(tau);
    double w = 0.0;
    if (tau <= MEET) {
        for (int i = 5; i >= 0; i--) {
            w = w * root + early[i];
        }
        return w / root;
    }
    for (int i = 0; i < MODES; i++) {
        w += exp(-MODE[i] * tau);
    }
    return w;
}

/* 16.12 */
double kent_trikha_weight(double tau)
{
    return 40.0 * exp(-8000.0 * tau) + 8.1 * exp(-200.0 * tau) + exp(-26.4 * tau);
}

/* 16.4 */
double kent_turbulent_weight(double tau, double shear_decay)
{
    return exp(-tau / shear_decay) / (2.0 * sqrt(PI * tau));
}

/* scale/Re^k, k = log10(lead/Re^slow) */
static double decay(double reynolds, double scale, double lead, double slow)
{
    const double log_re = kent_log(reynolds);
    const double k = (kent_log(lead) - slow * log_re) / kent_log(10.0);
    return scale / kent_pow(reynolds, k);
}

/* 16.5 */
double kent_shear_decay(double reynolds)
{
    return decay(reynolds, 12.86, 15.29, 0.0567);
}

/* 16.6 */
double kent_shear_decay_1996(double reynolds)
{
    return decay(reynolds, 7.41, 14.3, 0.05);
}

/* The part of W whose rates s^2 are spread with density ds/pi: 16.9, 16.10. Rates are
 * base (1 + 2 c g + g^2), g = FIRST RATIO^i; c is 1 where s = s0 (1 + g), 0 where the
 * rate is base + (s0 g)^2, s0^2 = base. */
static void add_spread(kent_weighting *w, double base, double c, double step)
{
    const double spacing = kent_log(RATIO) * sqrt(base) / PI; /* weight per g */
    const double slow = 1.0 / (RATIO - 1.0); /* of the terms below the first: 16.11 */
    const double g1 = FIRST * (RATIO - 1.0) / (RATIO * RATIO - 1.0);
    const double g2 = FIRST * FIRST * (RATIO - 1.0) / (RATIO * RATIO * RATIO - 1.0);
    w->rate[w->count] = base * (1.0 + 2.0 * c * g1 + g2);
    w->weight[w->count++] = spacing * FIRST * slow;
    double g = FIRST;
    for (int settled = 0; settled < SETTLED; g *= RATIO) {
        const double rate = base * (1.0 + 2.0 * c * g + g * g);
        if (rate * step <= OVER && w->count < KENT_FADES) {
            w->rate[w->count] = rate;
            w->weight[w->count++] = spacing * g;
        } else {
            w->at_once += spacing * g / rate;
            settled++;
        }
    }
}

/* 16.8 .. 16.11 */
kent_weighting kent_weighting_sum(double reynolds, double step)
{
    kent_weighting w = {0};
    if (reynolds > LAMINAR_UP_TO) {
        const double c = fmin(kent_shear_decay(reynolds), KENT_LAMINAR_SHEAR_DECAY);
        add_spread(&w, 1.0 / c, 0.0, step);
        return w;
    }
    for (; w.count < MODES; w.count++) {
        w.rate[w.count] = MODE[w.count];
        w.weight[w.count] = 1.0;
    }
    add_spread(&w, FAST_FROM * FAST_FROM, 1.0, step);
    return w;
}
