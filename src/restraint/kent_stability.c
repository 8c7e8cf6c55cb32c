#include "kent_stability.h"

#include <math.h>

/* source docs/theory/20-stability.md, 20.6 */
double kent_sliding_factor(double passive, double active, double friction,
                           double thrust)
{
    return thrust > 0.0 ? (passive - active + friction) / thrust : INFINITY;
}

/* source docs/theory/20-stability.md, 20.5 */
double kent_base_friction(double normal, double coefficient, double cohesion,
                          double area)
{
    if (!(normal > 0.0)) return 0.0;
    if (!isnan(cohesion)) return fmin(cohesion * area, 0.5 * normal);
    return isnan(coefficient) ? 0.0 : coefficient * normal;
}

/* source docs/theory/20-stability.md, 20.8 */
double kent_overturning_factor(double steadies, double topples)
{
    return topples > 0.0 ? steadies / topples : INFINITY;
}

/* source docs/theory/20-stability.md, 20.9, 20.10 */
kent_base_pressure kent_base_pressure_of(double normal, double moment, double length,
                                         double breadth)
{
    const double e = moment / normal, mean = normal / (breadth * length);
    const double off = fabs(e);
    kent_base_pressure p = {
        .eccentricity = e, .pressed = length, .outside_third = off > length / 6.0};

    if (!p.outside_third) {
        p.largest = mean * (1.0 + 6.0 * off / length);
        p.least = mean * (1.0 - 6.0 * off / length);
        return p;
    }
    p.pressed = fmax(0.0, 3.0 * (0.5 * length - off));
    p.largest = p.pressed > 0.0 ? 2.0 * normal / (breadth * p.pressed) : INFINITY;
    return p;
}

/* source docs/theory/20-stability.md, 20.11 */
double kent_flotation_factor(double weight, double displaced, double water)
{
    return displaced > 0.0 ? weight / (displaced * water) : INFINITY;
}

/* source docs/theory/20-stability.md, 20.4 */
double kent_soil_prism(double plan, double depth, double unit_weight,
                       double water_table, double water)
{
    const double under = fmax(0.0, depth - water_table);
    return plan * (unit_weight * depth - water * under);
}
