#include "kent_recorder_internal.h"

#include <assert.h>
#include <math.h>
#include <string.h>

static const double PI = 3.14159265358979323846;

/* Share of the sum of pushes below which a component is rounding of the geometry. */
static const double NEGLIGIBLE = 1e-9;

bool kent_fitting_in_network(const kent_fitting *f) { return f->point >= 0; }

static kent_balance balance_with_weight(const kent_fitting *f)
{
    kent_balance b = {0};

    if (f->weight > 0.0) b.weight = (kent_vec3){0.0, 0.0, -f->weight};
    return b;
}

void kent_frame_complete(const kent_model *m, const kent_fitting *f, kent_frame *frame)
{
    const kent_port *ports = &m->ports[f->port_first];
    const size_t widest = kent_port_widest(ports, f->port_count);
    size_t outlet = f->port_count; /* none */
    double drawn = 0.0, rate = 0.0;

    for (size_t i = 0; i < f->port_count; i++) {
        if (ports[i].kind == KENT_PORT_SPAN) {
            drawn -= frame->flow[i];
            rate -= frame->flow_rate[i];
            continue;
        }
        frame->head[i] = frame->head[widest];
        frame->flow[i] = frame->flow_rate[i] = 0.0;
        if (ports[i].kind == KENT_PORT_OUTLET) outlet = i;
    }
    if (outlet == f->port_count) return;
    frame->flow[outlet] = drawn;
    frame->flow_rate[outlet] = rate;
}

/* Pa that still water gains from the fitting's centre down to a port. */
static double pressure_below_centre(const kent_model *m, const kent_fitting *f,
                                    const kent_port *port)
{
    return m->water.density * m->gravity * (f->at.z - kent_port_level(f, port));
}

kent_instant kent_instant_of_frame(const kent_model *m, const kent_fitting *f,
                                   const kent_frame *frame)
{
    const kent_port *ports = &m->ports[f->port_first];
    const double rho = m->water.density;
    const size_t widest = kent_port_widest(ports, f->port_count);
    kent_instant out = {
        .set = true, .time = frame->time, .balance = balance_with_weight(f)};
    double speed[KENT_PORTS] = {0};

    for (size_t i = 0; i < f->port_count; i++) {
        const double bore = ports[i].inside_diameter;
        speed[i] = frame->flow[i] / (0.25 * PI * bore * bore);
    }
    for (size_t i = 0; i < f->port_count; i++) {
        kent_port_state *s = &out.balance.port[i];
        s->pressure =
            kent_model_pressure(m, frame->head[i], kent_port_level(f, &ports[i]));
        if (f->type != KENT_VALVE) {
            s->pressure +=
                0.5 * rho * (speed[widest] * speed[widest] - speed[i] * speed[i]);
        }
        if (ports[i].kind == KENT_PORT_OUTLET) s->pressure = 0.0;
        s->flow = frame->flow[i];
        s->flow_rate = ports[i].face > 0.0 ? frame->flow_rate[i] : 0.0;
        s->momentum_factor = kent_port_momentum_factor(m, &ports[i], frame->flow[i]);
    }
    out.pressure =
        out.balance.port[widest].pressure - pressure_below_centre(m, f, &ports[widest]);
    for (size_t i = 0; i < f->port_count && f->type == KENT_VALVE; i++) {
        out.pressure = fmax(out.pressure, out.balance.port[i].pressure);
    }
    kent_balance_sum(ports, f->port_count, rho, &out.balance);
    return out;
}

/* Which ports still water presses on. */
typedef struct kent_wet {
    int only;  /* that alone; -1: all */
    int dry;   /* all but that; -1 */
    bool shut; /* an open end is closed, and under pressure too */
} kent_wet;

static bool is_wet(const kent_wet *wet, const kent_port *port, size_t i)
{
    if (port->kind == KENT_PORT_OUTLET && !wet->shut) return false;
    return (wet->only < 0 || (size_t)wet->only == i) && wet->dry != (int)i;
}

static kent_instant instant_of_still_water(const kent_model *m, const kent_fitting *f,
                                           const kent_port *ports, size_t count,
                                           double pressure, kent_wet wet)
{
    kent_instant out = {.set = true,
                        .time = NAN,
                        .pressure = pressure,
                        .balance = balance_with_weight(f)};

    for (size_t i = 0; i < count; i++) {
        kent_port_state *s = &out.balance.port[i];
        if (is_wet(&wet, &ports[i], i)) {
            s->pressure = pressure + pressure_below_centre(m, f, &ports[i]);
        }
        s->momentum_factor = kent_port_momentum_factor(m, &ports[i], 0.0);
    }
    kent_balance_sum(ports, count, m->water.density, &out.balance);
    return out;
}

kent_instant kent_instant_at_rest(const kent_model *m, const kent_fitting *f,
                                  double pressure, int only)
{
    return instant_of_still_water(m, f, &m->ports[f->port_first], f->port_count,
                                  pressure, (kent_wet){only, -1, false});
}

kent_instant kent_instant_emptied(const kent_model *m, const kent_fitting *f,
                                  double pressure, size_t dry)
{
    return instant_of_still_water(m, f, &m->ports[f->port_first], f->port_count,
                                  pressure, (kent_wet){-1, (int)dry, false});
}

kent_instant kent_instant_extended(const kent_model *m, const kent_fitting *f,
                                   const kent_load_case *c, double pressure)
{
    kent_port ports[KENT_PORTS];
    const size_t count = kent_load_case_ports(m, f, c, ports);

    return instant_of_still_water(m, f, ports, count, pressure,
                                  (kent_wet){-1, -1, true});
}

/* The branch without a pipe as a leg: what joins it may slip, so that the pressure acts
 * on its outside diameter. */
static kent_port extended_leg(const kent_model *m, const kent_branch *branch)
{
    kent_port port = kent_port_blank();

    port.kind = KENT_PORT_STUB;
    port.direction = branch->direction;
    port.outside_diameter = branch->outside_diameter;
    port.inside_diameter = isnan(branch->inside_diameter) ? branch->outside_diameter
                                                          : branch->inside_diameter;
    port.seal_diameter =
        kent_seal_diameter(m, port.outside_diameter, port.inside_diameter, (double)NAN);
    return port;
}

size_t kent_load_case_ports(const kent_model *m, const kent_fitting *f,
                            const kent_load_case *c, kent_port out[KENT_PORTS])
{
    size_t count = f->port_count;
    bool there = false; /* the branch is among the fitting's own ports */

    assert(count <= KENT_PORTS);
    memcpy(out, &m->ports[f->port_first], count * sizeof *out);
    if (!c->extended) return count;
    for (size_t i = 0; i < count; i++) {
        if (out[i].kind != KENT_PORT_OUTLET) continue;
        out[i].seal_diameter =
            fmax(out[i].seal_diameter,
                 kent_seal_diameter(m, f->branch.outside_diameter,
                                    f->branch.inside_diameter, (double)NAN));
        there = true;
    }
    if (there) return count;
    assert(count < KENT_PORTS);
    out[count] = extended_leg(m, &f->branch);
    return count + 1;
}

/* The place of a port: of its point, at its own level. */
static kent_vec3 port_place(const kent_model *m, const kent_fitting *f,
                            const kent_port *port)
{
    const bool centre = port->kind != KENT_PORT_SPAN;
    kent_vec3 at = centre ? f->at : m->points[kent_port_point(m, f, port)].at;

    at.z = kent_port_level(f, port);
    return at;
}

kent_vec3 kent_instant_couple(const kent_model *m, const kent_fitting *f,
                              const kent_instant *i)
{
    kent_vec3 couple = {0.0, 0.0, 0.0};

    for (size_t k = 0; k < f->port_count; k++) {
        const kent_port *port = &m->ports[f->port_first + k];
        const kent_vec3 arm = kent_vec3_sub(port_place(m, f, port), f->at);
        const kent_vec3 push =
            kent_vec3_scale(-i->balance.port[k].push, port->direction);
        couple = kent_vec3_add(couple, kent_vec3_cross(arm, push));
    }
    return couple;
}

kent_instant kent_instant_given(const kent_model *m, const kent_fitting *f)
{
    const kent_port *ports = &m->ports[f->port_first];
    kent_instant out = {.set = true, .time = NAN, .balance = balance_with_weight(f)};

    for (size_t i = 0; i < f->port_count; i++) {
        kent_port_state *s = &out.balance.port[i];
        s->pressure = ports[i].pressure;
        s->flow = ports[i].flow;
        s->momentum_factor = kent_port_momentum_factor(m, &ports[i], ports[i].flow);
    }
    out.pressure = ports[kent_port_widest(ports, f->port_count)].pressure;
    kent_balance_sum(ports, f->port_count, m->water.density, &out.balance);
    return out;
}

kent_vec3 kent_instant_lasting(const kent_instant *i)
{
    return kent_vec3_sub(i->balance.thrust, i->balance.unsteady);
}

bool kent_instant_has_sense(const kent_instant *i, kent_sense sense)
{
    const kent_vec3 t = kent_instant_lasting(i);
    double sizes = kent_vec3_length(i->balance.weight);

    for (size_t k = 0; k < i->balance.port_count; k++) {
        sizes += fabs(i->balance.port[k].push);
    }
    switch (sense) {
    case KENT_SIDEWAYS:
        return kent_thrust_horizontal(t) > NEGLIGIBLE * sizes;
    case KENT_UPWARD:
        return t.z > NEGLIGIBLE * sizes;
    case KENT_DOWNWARD:
        return t.z < -NEGLIGIBLE * sizes;
    case KENT_RESULTANT:
    case KENT_SENSES:
        break;
    }
    return true; /* there is always a resultant, nil or not */
}
