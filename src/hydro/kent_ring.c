#include "kent_ring.h"

/* 18.1 */
double kent_ring_collapse(double modulus, double poisson, double wall, double diameter)
{
    const double ratio = wall / diameter;
    return 2.0 * modulus / (1.0 - poisson * poisson) * ratio * ratio * ratio;
}
