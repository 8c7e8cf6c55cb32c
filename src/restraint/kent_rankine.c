#include "kent_restraint.h"

/* source docs/theory/10-blocks.md, 10.18; range 0 .. pi/2 */
double kent_rankine_passive(double friction_angle)
{
    const double s = sin(friction_angle);
    return (1.0 + s) / (1.0 - s);
}

/* source docs/theory/10-blocks.md, 10.18 */
double kent_rankine_active(double friction_angle)
{
    const double s = sin(friction_angle);
    return (1.0 - s) / (1.0 + s);
}

/* source docs/theory/10-blocks.md, 10.19 */
double kent_passive_pressure(double friction_angle, double cohesion, double stress)
{
    const double kp = kent_rankine_passive(friction_angle);
    return kp * stress + 2.0 * cohesion * sqrt(kp);
}
