#include "kent_air.h"

#include "kent_math.h"

#include <math.h>

const double KENT_AIR_GAS_CONSTANT = 287.05287;

/* Share of the pressure over which the rate starts along a straight line. */
static const double START = 1e-4;

typedef struct share { /* of p0/sqrt(R T), with its slope */
    double value, by_ratio;
} share;

/* ratio r: lower over higher pressure, 0 .. 1. 14.12 for 1.4 as ratio of the specific
 * heats: psi2 = 7 (r^(10/7) - r^(12/7)), most at r = (5/6)^3.5, where it is choked. */
static share below_sound(double ratio)
{
    const double root = kent_pow(ratio, 1.0 / 7.0), x = root * root;
    if (x <= 5.0 / 6.0) { /* choked: no faster however low the pressure */
        return (share){sqrt(7.0 / 6.0) * (25.0 / 36.0) * sqrt(5.0 / 6.0), 0.0};
    }
    const double cube = root * x;
    const double value = sqrt(7.0 * (1.0 - x)) * x * x * root;
    return (share){value, cube * (5.0 - 6.0 * x) / value};
}

static share share_of(double ratio)
{
    const double start = 1.0 - START;
    if (ratio < start) return below_sound(ratio);
    const double slope = below_sound(start).value / START;
    return (share){slope * (1.0 - ratio), -slope};
}

/* 14.12 */
kent_air_rate kent_air_through(const kent_orifice *orifice, double inside)
{
    const double outside = orifice->outside;
    const double speed = sqrt(KENT_AIR_GAS_CONSTANT * orifice->temperature); /* m/s */
    if (inside < outside) {
        const share s = share_of(inside / outside);
        return (kent_air_rate){orifice->in * outside * s.value / speed,
                               orifice->in * s.by_ratio / speed};
    }
    const double ratio = outside / inside;
    const share s = share_of(ratio);
    return (kent_air_rate){-orifice->out * inside * s.value / speed,
                           -orifice->out * (s.value - ratio * s.by_ratio) / speed};
}
