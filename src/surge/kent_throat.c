#include "kent_throat_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

static double per_flow(double bore, double k, double gravity)
{
    const double area = 0.25 * PI * bore * bore;
    return k > 0.0 ? k / (2.0 * gravity * area * area) : 0.0;
}

kent_throat kent_throat_of(double bore, double k_out_of_main, double k_into_main,
                           double gravity)
{
    return (kent_throat){per_flow(bore, k_out_of_main, gravity),
                         per_flow(bore, k_into_main, gravity)};
}

kent_device_law kent_throat_law(const kent_throat *throat, double flow, double own,
                                double own_by_flow, double main)
{
    const double k = flow > 0.0 ? throat->out_of_main : throat->into_main;
    return (kent_device_law){own + k * flow * fabs(flow) - main,
                             own_by_flow + 2.0 * k * fabs(flow),
                             {-1.0, 0.0}};
}
