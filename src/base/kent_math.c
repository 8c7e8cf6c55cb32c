#include "kent_math.h"

#include <float.h>
#include <math.h>
#include <stdint.h>
#include <string.h>

/* ln 2 in two parts. The first has 20 zero bits at its end, so that a whole number
 * below 2^20 times it is exact; the second is what is left. */
static const double LN2_HIGH = 0x1.62e42fefp-1;
static const double LN2_LOW = 0x1.473de6af278edp-34;

/* A number as the unevaluated sum high + low. */
typedef struct pair {
    double high, low;
} pair;

/* a + b without error (Knuth). */
static inline pair sum_of(double a, double b)
{
    const double s = a + b;
    const double part = s - a;
    return (pair){s, (a - (s - part)) + (b - part)};
}

/* a b without error (Dekker 1971), by halves of 26 bits: no fused operation needed. */
static inline pair product_of(double a, double b)
{
    const double split = 134217729.0; /* 2^27 + 1 */
    const double ta = split * a, tb = split * b;
    const double ah = ta - (ta - a), bh = tb - (tb - b);
    const double al = a - ah, bl = b - bh;
    const double p = a * b;
    return (pair){p, ((ah * bh - p) + ah * bl + al * bh) + al * bl};
}

/* x = 2^k m with m in [sqrt(1/2), sqrt 2); x is normal. */
static inline double split_exponent(double x, int *k)
{
    uint64_t bits = 0;
    memcpy(&bits, &x, sizeof bits);
    /* Adding the distance from sqrt(1/2) to 1 carries into the exponent exactly where
     * the mantissa is past sqrt 2. */
    const uint64_t carried = bits + (UINT64_C(0x3FF0000000000000) - //
                                     UINT64_C(0x3FE6A09E667F3BCD));
    *k = (int)(carried >> 52) - 1023;
    bits -= (uint64_t)(int64_t)*k << 52;
    double m = 0.0;
    memcpy(&m, &bits, sizeof m);
    return m;
}

/* With s = (m - 1)/(m + 1): (ln m - 2 s)/s = 2 (s^2/3 + s^4/5 + ...), z = s^2 <=
 * 0.0295. The first term left out is below 2^-58 of ln m. */
static inline double log_tail(double z)
{
    const double z2 = z * z;
    const double z4 = z2 * z2;
    const double a = 2.0 / 3.0 + z * (2.0 / 5.0);
    const double b = 2.0 / 7.0 + z * (2.0 / 9.0);
    const double c = 2.0 / 11.0 + z * (2.0 / 13.0);
    const double d = 2.0 / 15.0 + z * (2.0 / 17.0);
    const double e = 2.0 / 19.0 + z * (2.0 / 21.0);
    return z * ((a + z2 * b) + z4 * ((c + z2 * d) + z4 * e));
}

double kent_log(double x)
{
    if (!(x >= DBL_MIN && x <= DBL_MAX)) return log(x);

    int k = 0;
    const double f = split_exponent(x, &k) - 1.0; /* exact: m is within a factor of 2 */
    const double s = f / (2.0 + f);
    const double half = 0.5 * f * f;
    const double tail = log_tail(s * s);
    /* 2 s = f - f^2/2 + s f^2/2, so that the large parts are free of rounding. */
    return k * LN2_HIGH - ((half - (s * (half + tail) + k * LN2_LOW)) - f);
}

/* ln x in two parts, together good to about 2^-60. */
static inline pair log_pair(double x)
{
    int k = 0;
    const double m = split_exponent(x, &k);
    const double f = m - 1.0;
    const pair d = sum_of(m, 1.0);
    const double s = f / d.high;
    const pair back = product_of(s, d.high);
    const double s_low = (((f - back.high) - back.low) - s * d.low) / d.high;
    const pair whole = sum_of(k * LN2_HIGH, 2.0 * s);
    const double low = whole.low + (2.0 * s_low + s * log_tail(s * s) + k * LN2_LOW);
    const double high = whole.high + low;
    return (pair){high, low - (high - whole.high)};
}

/* e to the power p.high + p.low, |p.high| < 700. */
static inline double exp_pair(pair p)
{
    const double inverse_ln2 = 1.4426950408889634;
    const double turns = p.high * inverse_ln2;
    const int n = (int)(turns < 0.0 ? turns - 0.5 : turns + 0.5);
    const double r = ((p.high - n * LN2_HIGH) - n * LN2_LOW) + p.low;
    const double r2 = r * r;
    const double r4 = r2 * r2;
    /* Taylor to r^13/13!; |r| <= 0.35, so that the next term is below 1e-17. */
    const double a = 1.0 / 2.0 + r * (1.0 / 6.0);
    const double b = 1.0 / 24.0 + r * (1.0 / 120.0);
    const double c = 1.0 / 720.0 + r * (1.0 / 5040.0);
    const double d = 1.0 / 40320.0 + r * (1.0 / 362880.0);
    const double e = 1.0 / 3628800.0 + r * (1.0 / 39916800.0);
    const double g = 1.0 / 479001600.0 + r * (1.0 / 6227020800.0);
    const double curve = (a + r2 * b) + r4 * ((c + r2 * d) + r4 * (e + r2 * g));
    const double mantissa = 1.0 + (r + r2 * curve);

    const uint64_t bits = (uint64_t)(n + 1023) << 52; /* 2^n; n is within +-1010 */
    double scale = 0.0;
    memcpy(&scale, &bits, sizeof scale);
    return mantissa * scale;
}

double kent_pow(double x, double y)
{
    if (!(x >= DBL_MIN && x <= DBL_MAX)) return pow(x, y);

    const pair ln = log_pair(x);
    if (!(fabs(y * ln.high) < 700.0)) return pow(x, y);
    const pair main_part = product_of(y, ln.high);
    return exp_pair((pair){main_part.high, main_part.low + y * ln.low});
}

/* atan(k/8) as high + low. */
static const pair ATAN_EIGHTHS[9] = {{0.0, 0.0},
                                     {0x1.fd5ba9aac2f6ep-4, -0x1.cd37686760c17p-59},
                                     {0x1.f5b75f92c80ddp-3, 0x1.8ab6e3cf7afbdp-57},
                                     {0x1.6f61941e4def1p-2, -0x1.c63aae6f6e918p-56},
                                     {0x1.dac670561bb4fp-2, 0x1.a2b7f222f65e2p-56},
                                     {0x1.1e00babdefeb4p-1, -0x1.928df287a668fp-58},
                                     {0x1.4978fa3269ee1p-1, 0x1.2419a87f2a458p-56},
                                     {0x1.700a7c5784634p-1, -0x1.8c34d25aadef6p-56},
                                     {0x1.921fb54442d18p-1, 0x1.1a62633145c07p-55}};
static const pair HALF_PI = {0x1.921fb54442d18p+0, 0x1.1a62633145c07p-54};
static const pair PI = {0x1.921fb54442d18p+1, 0x1.1a62633145c07p-53};

/* Angle of (x, y) with 0 <= y <= x, x > 0: from that of the nearest eighth k/8 of y/x,
 * tan(angle - atan(k/8)) = (y - x k/8)/(x + y k/8), at most 1/16. */
static inline pair angle_of(double y, double x)
{
    const int k = (int)(8.0 * (y / x) + 0.5);
    const double eighths = 0.125 * k;
    const double r = (y - x * eighths) / (x + y * eighths);
    const double z = r * r, z2 = z * z;
    /* Taylor to r^13/13; the first term left out is below 2^-59 of r. */
    const double a = -1.0 / 3.0 + z * (1.0 / 5.0);
    const double b = -1.0 / 7.0 + z * (1.0 / 9.0);
    const double c = -1.0 / 11.0 + z * (1.0 / 13.0);
    const double tail = r * (z * (a + z2 * (b + z2 * c)));
    return (pair){ATAN_EIGHTHS[k].high, ATAN_EIGHTHS[k].low + tail + r};
}

double kent_atan2(double y, double x)
{
    const double ay = fabs(y), ax = fabs(x);
    if (ax == 0.0 && ay == 0.0) return 0.0;
    if (!(ax <= 1e300 && ay <= 1e300)) return atan2(y, x);
    pair angle = ay <= ax ? angle_of(ay, ax) : angle_of(ax, ay);
    if (ay > ax) {
        angle = (pair){HALF_PI.high - angle.high, HALF_PI.low - angle.low};
    }
    if (x < 0.0) angle = (pair){PI.high - angle.high, PI.low - angle.low};
    return copysign(angle.high + angle.low, y);
}
