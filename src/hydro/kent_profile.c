#include "kent_profile.h"

/* From a laminar value below Re 2000 to a turbulent one above 4000, a straight line. */
static double across(double reynolds, double laminar, double turbulent)
{
    if (reynolds <= 2000.0) return laminar;
    if (reynolds >= 4000.0) return turbulent;
    return laminar + (turbulent - laminar) * (reynolds - 2000.0) / 2000.0;
}

/* 4.4 */
double kent_momentum_factor(double reynolds, double friction_factor)
{
    return across(reynolds, 4.0 / 3.0, 1.0 + 0.98 * friction_factor);
}

/* 4.5 */
double kent_energy_factor(double reynolds, double friction_factor)
{
    return across(reynolds, 2.0, 1.0 + 2.7 * friction_factor);
}

/* Mean of (u/umax)^power over the section: 4.6. */
static double power_mean(double n, double power)
{
    return 2.0 * n * n / ((n + power) * (2.0 * n + power));
}

/* 4.7 */
void kent_power_profile(double n, double *mean, double *momentum, double *energy)
{
    const double v = power_mean(n, 1.0);
    *mean = v;
    *momentum = power_mean(n, 2.0) / (v * v);
    *energy = power_mean(n, 3.0) / (v * v * v);
}
