#include "kent_stroke_internal.h"

#include <math.h>

/* Share of a stroke that rounding of counted steps may leave undone: "shut" must mean
 * shut. */
static const double REST = 1e-9;

kent_stroke kent_stroke_from(double opening, double step, double opening_time,
                             double closure_time)
{
    const double up = opening_time > 0.0 ? step / opening_time : 1.0;
    const double down = closure_time > 0.0 ? step / closure_time : 1.0;
    const double least = opening - down, most = opening + up;
    return (kent_stroke){least > REST ? least : 0.0, most < 1.0 - REST ? most : 1.0};
}

/* Q|Q|/E^2 - (H0 - H1), with E > 0 */
static kent_device_law passes(double flow, const double head[2], double capacity)
{
    const double inverse = 1.0 / (capacity * capacity);
    return (kent_device_law){flow * fabs(flow) * inverse - (head[0] - head[1]),
                             2.0 * fabs(flow) * inverse,
                             {-1.0, 1.0}};
}

kent_device_law kent_stroke_law(double flow, const double head[2], double least,
                                double most, const kent_device_law *wish)
{
    const kent_device_law nil = {flow, 1.0, {0.0, 0.0}};
    if (!(most > 0.0)) return nil;

    kent_device_law law = passes(flow, head, most);
    if (least < most) {
        kent_device_law other = *wish;
        if (least > 0.0) { /* else it may shut: no flow is too little */
            const kent_device_law tight = passes(flow, head, least);
            if (tight.f < other.f) other = tight;
        }
        if (other.f > law.f) law = other;
    }
    return nil.f <= law.f ? nil : law;
}

double kent_stroke_opening(const kent_stroke *stroke, double capacity, double flow,
                           const double head[2], double wish)
{
    const double drop = head[0] - head[1];
    if (drop > 0.0) { /* shut where nothing flows down it */
        return fmin(fmax(flow / (capacity * sqrt(drop)), stroke->least), stroke->most);
    }
    return wish > 0.0 ? stroke->least : stroke->most;
}
