#include "kent_screening.h"

#include <math.h>

/* 18.2 */
double kent_screening_sudden(double density, double wave_speed, double velocity)
{
    return density * wave_speed * velocity;
}

/* 18.4 */
double kent_screening_slow(double density, double length, double velocity, double time)
{
    return 2.0 * density * length * velocity / time;
}

/* 18.5 */
double kent_screening_linear(double sudden, double return_time, double time)
{
    return time > return_time ? sudden * return_time / time : sudden;
}

/* s: where a straight line between two instants passes a flow. */
static double instant_of(double t0, double q0, double t1, double q1, double flow)
{
    return q1 == q0 ? t1 : t0 + (flow - q0) / (q1 - q0) * (t1 - t0);
}

/* 18.6. The change is that from the first flow to the one farthest from it. */
double kent_screening_effective_time(const double *time, size_t time_stride,
                                     const double *flow, size_t flow_stride,
                                     size_t count)
{
    size_t farthest = 0;
    for (size_t i = 1; i < count; i++) {
        const double gap = fabs(flow[i * flow_stride] - flow[0]);
        if (gap > fabs(flow[farthest * flow_stride] - flow[0])) farthest = i;
    }
    const double change = count > 0 ? flow[farthest * flow_stride] - flow[0] : 0.0;
    if (!(fabs(change) > 0.0)) return NAN;
    double at[2] = {NAN, NAN}; /* s, of 10 and of 90 % */
    for (size_t i = 1; i <= farthest; i++) {
        const double before = (flow[(i - 1) * flow_stride] - flow[0]) / change;
        const double share = (flow[i * flow_stride] - flow[0]) / change;
        const double t0 = time[(i - 1) * time_stride], t1 = time[i * time_stride];
        for (int k = 0; k < 2; k++) {
            const double mark = k == 0 ? 0.1 : 0.9;
            if (!isnan(at[k]) || share < mark) continue;
            at[k] = instant_of(t0, before, t1, share, mark);
        }
    }
    return (at[1] - at[0]) / 0.8;
}
