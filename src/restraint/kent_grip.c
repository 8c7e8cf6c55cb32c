#include "kent_restraint.h"

static const double PI = 3.14159265358979323846;

/* source docs/theory/11-restrained-length.md, 11.3 .. 11.7 */
kent_soil_grip kent_soil_grip_of(const kent_trench *t)
{
    const double d = t->outside_diameter;
    const double earth = t->unit_weight * t->cover * d;
    const double load = 2.0 * earth + t->pipe_weight + t->water_weight;
    const double weight = load * cos(t->slope); /* 11.22 */
    const double sliding = weight * tan(t->friction_ratio * t->friction_angle);
    const double adhesion = PI * d * t->adhesion_ratio * t->cohesion; /* whole, N/m */
    const double stress = t->unit_weight * (t->cover + 0.5 * d);      /* at the axis */
    const double passive =
        kent_passive_pressure(t->friction_angle, t->cohesion, stress);

    return (kent_soil_grip){
        .pipe_weight = t->pipe_weight,
        .water_weight = t->water_weight,
        .earth_load = earth,
        .friction = 0.5 * adhesion + sliding,
        .friction_whole = adhesion + sliding,
        .bearing = t->passive_ratio * passive * d,
    };
}

/* source docs/theory/11-restrained-length.md, 11.9 */
double kent_restrained_length_bend(double force, double angle, double factor,
                                   double friction, double bearing)
{
    return factor * force * tan(0.5 * angle) / (friction + 0.5 * bearing);
}

/* source docs/theory/11-restrained-length.md, 11.10 */
double kent_restrained_length_end(double force, double factor, double friction)
{
    return factor * force / friction;
}

/* source docs/theory/11-restrained-length.md, 11.19 */
double kent_soil_bearing_etl(const kent_trench *t)
{
    const double d = t->outside_diameter;
    const double stress = t->unit_weight * (t->cover + 0.5 * d);
    return t->passive_ratio * kent_passive_pressure(t->friction_angle, 0.0, stress) * d;
}

/* source docs/theory/11-restrained-length.md, 11.21 */
double kent_restrained_length_branch(double force, double factor, double credit,
                                     double friction)
{
    return fmax(0.0, factor * force - credit) / friction;
}
