#include "kent_friction.h"

#include "kent_math.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
static const double TWO_OVER_LN10 = 0.86858896380650365530;

enum { LAMINAR_TO = 2000, TURBULENT_FROM = 4000 }; /* Reynolds numbers */

/* A Darcy factor and how it follows the speed: (v/f) df/dv. */
typedef struct law_value {
    double factor, elasticity;
} law_value;

/* 3.4: x = 1/sqrt f solves F(x) = x + C ln(a + b x) = 0 with C = 2/ln 10,
 * a = roughness/3.7, b = 2.51/Re. F is nearly straight in x, and its curvature is at
 * hand: Halley's method from a middling x leaves less than 1e-14 after three steps. */
static law_value colebrook_white(double reynolds, double relative_roughness)
{
    const double a = relative_roughness / 3.7;
    const double b = 2.51 / reynolds;
    double x = 8.0; /* f = 0.0156 */
    double u = 0.0; /* b/(a + b x) */

    for (int i = 0; i < 10; i++) {
        const double inside = a + b * x;
        u = b / inside;
        const double value = x + TWO_OVER_LN10 * kent_log(inside);
        const double slope = 1.0 + TWO_OVER_LN10 * u;
        const double bend = -TWO_OVER_LN10 * u * u;
        const double step = value * slope / (slope * slope - 0.5 * value * bend);
        x -= step;
        /* The error cubes: behind a step this small nothing is left to gain. */
        if (fabs(step) < 1e-5 * x) break;
    }
    u = b / (a + b * x);
    const double f = 1.0 / (x * x);
    return (law_value){f,
                       -2.0 * TWO_OVER_LN10 * u / (1.0 + TWO_OVER_LN10 * u)}; /* 3.5 */
}

/* 3.2 to 3.6; reynolds > 0 */
static law_value colebrook_all(double reynolds, double relative_roughness)
{
    if (reynolds <= LAMINAR_TO) return (law_value){64.0 / reynolds, -1.0};
    if (reynolds >= TURBULENT_FROM) {
        return colebrook_white(reynolds, relative_roughness);
    }

    const double low = 64.0 / LAMINAR_TO;
    const double high = colebrook_white(TURBULENT_FROM, relative_roughness).factor;
    const double slope = (high - low) / (TURBULENT_FROM - LAMINAR_TO);
    const double f = low + slope * (reynolds - LAMINAR_TO);
    return (law_value){f, slope * reynolds / f};
}

double kent_colebrook(double reynolds, double relative_roughness)
{
    const double re = reynolds > 1.0 ? reynolds : 1.0;
    return colebrook_all(re, relative_roughness).factor;
}

/* 3.7 */
double kent_swamee_jain(double reynolds, double relative_roughness)
{
    const double inside = relative_roughness / 3.7 + 5.74 / kent_pow(reynolds, 0.9);
    const double root = TWO_OVER_LN10 * kent_log(inside); /* 2 log10 */
    return 1.0 / (root * root);
}

/* The factor at a speed > 0 and the Reynolds number that belongs to it, laminar floor
 * included: 3.8 to 3.11 */
static law_value value_at(const kent_friction *friction, double v, double reynolds)
{
    const law_value laminar = {64.0 / reynolds, -1.0};
    const double c = friction->coefficient;
    const double d = friction->bore;
    const double g = friction->gravity;
    law_value law = {0.0, 0.0};

    switch (friction->law) {
    case KENT_FRICTIONLESS:
        return law;
    case KENT_COLEBROOK_WHITE:
        return colebrook_all(reynolds, c / d);
    case KENT_HAZEN_WILLIAMS:
        law.factor = 2.0 * g * 10.667 * kent_pow(0.25 * PI / c, 1.852) *
                     kent_pow(d, 1.0 + 2.0 * 1.852 - 4.8704) * kent_pow(v, 1.852 - 2.0);
        law.elasticity = 1.852 - 2.0;
        break;
    case KENT_MANNING:
        law.factor = 8.0 * g * c * c * kent_pow(4.0 / d, 1.0 / 3.0);
        break;
    case KENT_DARCY_FIXED:
        law.factor = c;
        break;
    }
    return laminar.factor > law.factor ? laminar : law;
}

/* Below this Reynolds number the laminar line is used without dividing by the speed. */
static const double STANDSTILL = 1e-9;

double kent_friction_factor(const kent_friction *friction, double speed)
{
    const double per_speed = friction->bore / friction->kinematic_viscosity;
    const double slowest = STANDSTILL / per_speed;
    const double v = fabs(speed) > slowest ? fabs(speed) : slowest;
    return value_at(friction, v, v * per_speed).factor;
}

/* 3.1, 3.12 */
double kent_friction_slope(const kent_friction *friction, double flow,
                           double *derivative)
{
    const double d = friction->bore;
    const double area = 0.25 * PI * d * d;
    const double speed = flow / area;
    const double v = fabs(speed);
    const double per_factor = 1.0 / (2.0 * friction->gravity * d);
    const double reynolds = v * d / friction->kinematic_viscosity;

    if (friction->law == KENT_FRICTIONLESS) {
        *derivative = 0.0;
        return 0.0;
    }
    if (reynolds <= STANDSTILL) {
        const double line = 64.0 * friction->kinematic_viscosity / d * per_factor;
        *derivative = line / area;
        return line * speed;
    }
    const law_value law = value_at(friction, v, reynolds);
    *derivative = (2.0 + law.elasticity) * law.factor * v * per_factor / area;
    return law.factor * v * speed * per_factor;
}
