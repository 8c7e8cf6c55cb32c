#include "kent_earth.h"
#include "kent_restraint.h"

#include <assert.h>
#include <math.h>

static const double PI = 3.14159265358979323846;

/* source docs/theory/21-ground.md, 21.2 */
double kent_falling_passive(double friction_angle, double wall_friction, double falls)
{
    const double phi = friction_angle, delta = wall_friction;
    const double rises = sin(phi - falls);

    if (!(falls <= 0.0 || rises > 0.0)) return NAN; /* steeper than the soil stands */
    const double root = sqrt(sin(phi + delta) * rises / (cos(delta) * cos(falls)));
    if (!(root < 1.0)) return NAN;
    const double shape = cos(phi) / (1.0 - root);
    return shape * shape; /* Coulomb's over cos(delta), times cos(delta) */
}

/* source docs/theory/21-ground.md, 21.1 */
double kent_coulomb_passive(double friction_angle, double wall_friction)
{
    return kent_falling_passive(friction_angle, wall_friction, 0.0) /
           cos(wall_friction);
}

/* source docs/theory/21-ground.md, 21.3 */
double kent_coulomb_limit(double friction_angle) { return friction_angle / 3.0; }

/* source docs/theory/21-ground.md, 21.13 */
double kent_passive_plane(double friction_angle, double wall_friction)
{
    const double t = tan(friction_angle), d = tan(wall_friction);

    if (!(wall_friction > 0.0)) return 0.25 * PI - 0.5 * friction_angle; /* Rankine's */
    const double both = t + 1.0 / t;
    return atan((t + sqrt(t * both * (1.0 + d / t))) / (1.0 + d * both)) -
           friction_angle;
}

/* Pa m: the area under the effective vertical stress between two depths. */
static double stress_area(const kent_earth *e, double top, double base)
{
    const double wet = fmax(0.0, base - e->water_table);
    const double wet_top = fmax(0.0, top - e->water_table);

    return 0.5 * e->unit_weight * (base * base - top * top) -
           0.5 * e->water * (wet * wet - wet_top * wet_top);
}

/* source docs/theory/21-ground.md, 21.4 */
double kent_face_passive(const kent_earth *earth, double top, double base)
{
    const double kp = kent_rankine_passive(earth->friction_angle);

    assert(!(top > base));
    return kp * stress_area(earth, top, base) +
           2.0 * earth->cohesion * sqrt(kp) * (base - top);
}

/* m: how deep soil of a cohesion stands by itself. */
static double stands_to(const kent_earth *e, double ka)
{
    const double stress = 2.0 * e->cohesion / sqrt(ka);
    const double dry = stress / e->unit_weight;

    if (dry <= e->water_table) return dry;
    const double below = stress - e->unit_weight * e->water_table;
    return e->water_table + below / (e->unit_weight - e->water);
}

/* source docs/theory/21-ground.md, 21.5 */
double kent_face_active(const kent_earth *earth, double top, double base)
{
    const double ka = kent_rankine_active(earth->friction_angle);
    const double from = fmax(top, stands_to(earth, ka));

    if (!(from < base)) return 0.0;
    return ka * stress_area(earth, from, base) -
           2.0 * earth->cohesion * sqrt(ka) * (base - from);
}

/* source docs/theory/21-ground.md, 21.6 */
double kent_face_cut(double centre, double height, double table)
{
    const double half = 0.5 * height, off = fabs(centre - table);

    if (!(off < half)) return 0.0; /* dry, or all of it under water */
    return (half - off) * (half - off) / (2.0 * height);
}
