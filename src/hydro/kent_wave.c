#include "kent_wave.h"

#include <math.h>

static const double ATMOSPHERE = 101325.0; /* Pa */

/* 2.3 */
double kent_wave_equivalent_thickness(const kent_wall *wall)
{
    if (!(wall->lining > 0.0)) return wall->thickness;
    return wall->thickness + wall->lining * wall->lining_modulus / wall->modulus;
}

/* What axial support leaves of the hoop strain: 2.4. */
static double axial_share(double poisson, kent_axial_support support)
{
    switch (support) {
    case KENT_FLEXIBLE_JOINTS:
        return 1.0;
    case KENT_FIXED_UPSTREAM:
        return 1.0 - 0.5 * poisson;
    case KENT_FIXED_THROUGHOUT:
        return 1.0 - poisson * poisson;
    }
    return NAN;
}

/* 2.4 thin, 2.5 thick */
double kent_wave_support_factor(const kent_wall *wall, kent_axial_support support,
                                bool thin)
{
    const double share = axial_share(wall->poisson, support);
    if (thin) return share;

    const double d = wall->bore;
    const double e = kent_wave_equivalent_thickness(wall);
    return 2.0 * e / d * (1.0 + wall->poisson) + d / (d + e) * share;
}

/* 2.6 .. 2.8 */
kent_mixture kent_wave_mixture(double density, double bulk_modulus, double gas_content,
                               double pressure)
{
    const double x = gas_content * ATMOSPHERE / pressure;
    return (kent_mixture){
        .gas_share = x,
        .density = (1.0 - x) * density,
        .bulk_modulus = 1.0 / ((1.0 - x) / bulk_modulus + x / pressure),
    };
}

/* 2.1, 2.2 */
double kent_wave_speed(const kent_wall *wall, kent_axial_support support, bool thin,
                       double density, double bulk_modulus)
{
    const double free_speed = sqrt(bulk_modulus / density);
    if (isinf(wall->modulus)) return free_speed;

    const double e = kent_wave_equivalent_thickness(wall);
    const double yielding = kent_wave_support_factor(wall, support, thin) *
                            bulk_modulus * wall->bore / (wall->modulus * e);
    return free_speed / sqrt(1.0 + yielding);
}
