#include "kent_model_internal.h"

#include <assert.h>
#include <math.h>

static const double PI = 3.14159265358979323846;

double kent_span_still_pressure(const kent_model *m, const kent_span *span)
{
    double highest = -INFINITY; /* m */

    for (size_t i = 0; i < m->fixed_level_count; i++) {
        highest = fmax(highest, m->fixed_levels[i].level);
    }
    for (size_t i = 0; i < m->state_level_count; i++) {
        highest = fmax(highest, m->state_levels[i].level);
    }
    const double depth = highest - kent_span_level(m, span, 0.5 * span->length);
    return m->barometric + m->water.density * m->gravity * fmax(0.0, depth);
}

kent_mixture kent_span_mixture(const kent_model *m, const kent_span *span)
{
    if (!(m->gas_content > 0.0)) { /* to the last bit */
        return (kent_mixture){
            .density = m->water.density,
            .bulk_modulus = m->water.bulk_modulus,
        };
    }
    return kent_wave_mixture(m->water.density, m->water.bulk_modulus, m->gas_content,
                             kent_span_still_pressure(m, span));
}

void kent_span_fill(const kent_model *m, kent_span *span)
{
    const kent_pipe *pipe = &m->pipes[span->pipe];
    const size_t last = span->route_first + span->route_count - 1;
    const double whole = m->chainage[pipe->route_first + pipe->route_count - 1];

    span->length = m->chainage[last] - m->chainage[span->route_first];
    span->bore = pipe->inside_diameter;
    span->area = PI * span->bore * span->bore / 4.0;
    span->loss = pipe->loss * span->length / whole; /* equation 5.2 */
    span->friction =
        (kent_friction){.law = pipe->friction,
                        .coefficient = pipe->friction_coefficient,
                        .bore = span->bore,
                        .kinematic_viscosity = m->water.viscosity / m->water.density,
                        .gravity = m->gravity};
    if (isnan(pipe->wave_speed)) {
        const kent_wall wall = {.bore = pipe->inside_diameter,
                                .thickness = pipe->wall,
                                .modulus = pipe->modulus,
                                .poisson = pipe->poisson,
                                .lining = pipe->lining,
                                .lining_modulus = pipe->lining_modulus};
        const kent_mixture mixture = kent_span_mixture(m, span);
        span->wave_speed = kent_wave_speed(&wall, pipe->axial_support, pipe->thin_wall,
                                           mixture.density, mixture.bulk_modulus);
    } else {
        span->wave_speed = pipe->wave_speed;
    }
}

double kent_span_level(const kent_model *m, const kent_span *span, double chainage)
{
    const size_t last = span->route_first + span->route_count - 1;
    const double from = m->chainage[span->route_first];
    size_t s = span->route_first; /* the leg from stop s to s + 1 */

    assert(span->route_count >= 2);
    while (s + 1 < last && m->chainage[s + 1] - from < chainage) {
        s++;
    }
    const double start = m->points[m->route[s]].at.z;
    const double end = m->points[m->route[s + 1]].at.z;
    const double leg = m->chainage[s + 1] - m->chainage[s];
    const double share = (chainage - (m->chainage[s] - from)) / leg;
    return start + fmin(fmax(share, 0.0), 1.0) * (end - start);
}

/* Equation 5.3. */
double kent_span_loss(const kent_model *m, const kent_span *span, double flow,
                      double *derivative)
{
    const double minor = span->loss / (2.0 * m->gravity * span->area * span->area);
    double slope_rise = 0.0; /* s/m3 per m */
    const double slope = kent_friction_slope(&span->friction, flow, &slope_rise);

    if (derivative) {
        *derivative = slope_rise * span->length + 2.0 * minor * fabs(flow);
    }
    return slope * span->length + minor * flow * fabs(flow);
}
