#include "kent_wedge.h"
#include "kent_earth.h"

#include <math.h>

static const double QUARTER = 0.78539816339744831; /* rad: 45 degrees */

double kent_wedge_reach(const kent_wedge *wedge)
{
    return wedge->base /
           tan(kent_passive_plane(wedge->friction_angle, wedge->wall_friction));
}

double kent_wedge_half_width(const kent_wedge *wedge, double before)
{
    const double spread = tan(QUARTER - 0.5 * wedge->friction_angle);
    return wedge->half_width + before * spread;
}

double kent_wedge_clearance(const kent_wedge *wedge, double along, double across)
{
    const double beyond = along - wedge->front;
    const double half = kent_wedge_half_width(wedge, fmax(0.0, beyond));
    const double ahead = beyond - kent_wedge_reach(wedge);
    const double beside = fabs(across) - half;

    if (along <= 0.0) return fmax(0.0, hypot(fmax(0.0, beside), along));
    return fmax(0.0, fmax(ahead, beside));
}

double kent_wedge_farthest(const kent_wedge *wedge, double along, double across)
{
    const double reach = kent_wedge_reach(wedge);
    const double near = wedge->front * along + wedge->half_width * fabs(across);
    const double far = (wedge->front + reach) * along +
                       kent_wedge_half_width(wedge, reach) * fabs(across);

    return fmax(near, far);
}
