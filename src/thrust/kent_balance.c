#include "kent_balance.h"

#include <assert.h>
#include <float.h>
#include <math.h>

static const double PI = 3.14159265358979323846;

/* A sum of forces that cancel leaves rounding, which is not a thrust. */
static double without_rounding(double sum, double sizes)
{
    return fabs(sum) <= 16.0 * DBL_EPSILON * sizes ? 0.0 : sum;
}

void kent_balance_sum(const kent_port *ports, size_t count, double density,
                      kent_balance *b)
{
    kent_vec3 push = {0.0, 0.0, 0.0}, inertia = {0.0, 0.0, 0.0};
    double sizes = kent_vec3_length(b->weight);

    assert(count <= KENT_PORTS);
    b->port_count = count;
    for (size_t i = 0; i < count; i++) {
        const kent_port *port = &ports[i];
        kent_port_state *s = &b->port[i];
        const double seal = 0.25 * PI * port->seal_diameter * port->seal_diameter;
        const double bore = 0.25 * PI * port->inside_diameter * port->inside_diameter;

        s->pressure_force = s->pressure * seal;
        s->momentum_flux = s->momentum_factor * density * s->flow * s->flow / bore;
        s->push = s->pressure_force + s->momentum_flux;
        push = kent_vec3_add(push, kent_vec3_scale(-s->push, port->direction));
        inertia =
            kent_vec3_add(inertia, kent_vec3_scale(-density * s->flow_rate * port->face,
                                                   port->direction));
        sizes += fabs(s->push);
    }
    b->unsteady = inertia;
    const kent_vec3 sum = kent_vec3_add(kent_vec3_add(push, b->weight), inertia);
    b->thrust =
        (kent_vec3){without_rounding(sum.x, sizes), without_rounding(sum.y, sizes),
                    without_rounding(sum.z, sizes)};
}

double kent_port_momentum_factor(const kent_model *m, const kent_port *port,
                                 double flow)
{
    const double bore = port->inside_diameter;
    const double speed = fabs(flow) / (0.25 * PI * bore * bore);
    const double viscosity = m->water.viscosity / m->water.density; /* m2/s */

    if (!isnan(port->momentum_factor)) return port->momentum_factor;
    const double reynolds = speed * bore / viscosity;
    const double factor =
        port->span >= 0 ? kent_friction_factor(&m->spans[port->span].friction, speed)
                        : kent_colebrook(reynolds, 0.0);
    return kent_momentum_factor(reynolds, factor);
}

/* A head or pressure of its own, which a dead branch and an open end have not. */
static bool port_leads(const kent_port *port)
{
    return port->kind == KENT_PORT_SPAN || port->kind == KENT_PORT_GIVEN;
}

size_t kent_port_widest(const kent_port *ports, size_t count)
{
    size_t widest = 0;

    for (size_t i = 1; i < count; i++) {
        if (!port_leads(&ports[i])) continue;
        if (!port_leads(&ports[widest]) ||
            ports[i].inside_diameter > ports[widest].inside_diameter) {
            widest = i;
        }
    }
    return widest;
}

double kent_port_level(const kent_fitting *f, const kent_port *port)
{
    return isnan(port->level) ? f->at.z : port->level;
}

int kent_port_point(const kent_model *m, const kent_fitting *f, const kent_port *port)
{
    if (port->kind != KENT_PORT_SPAN) return f->point;
    const kent_span *span = &m->spans[port->span];
    const size_t first = span->route_first;
    double least = INFINITY;
    int point = f->point;

    for (size_t r = first; r < first + span->route_count; r++) {
        const double gap = fabs(m->chainage[r] - m->chainage[first] - port->chainage);
        if (!(gap < least)) continue;
        least = gap;
        point = m->route[r];
    }
    return point;
}

double kent_balance_flow_gap(const kent_port *ports, size_t count)
{
    double sum = 0.0, largest = 0.0;

    for (size_t i = 0; i < count; i++) {
        sum += ports[i].flow;
        largest = fmax(largest, fabs(ports[i].flow));
    }
    return largest > 0.0 ? fmin(fabs(sum) / largest, 1.0) : 0.0;
}
