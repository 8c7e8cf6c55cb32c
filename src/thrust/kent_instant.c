#include "kent_recorder_internal.h"

#include <math.h>

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
    out.pressure = out.balance.port[widest].pressure -
                   pressure_below_centre(m, f, &ports[widest]);
    for (size_t i = 0; i < f->port_count && f->type == KENT_VALVE; i++) {
        out.pressure = fmax(out.pressure, out.balance.port[i].pressure);
    }
    kent_balance_sum(ports, f->port_count, rho, &out.balance);
    return out;
}

kent_instant kent_instant_at_rest(const kent_model *m, const kent_fitting *f,
                                  double pressure, int only)
{
    const kent_port *ports = &m->ports[f->port_first];
    kent_instant out = {.set = true,
                        .time = NAN,
                        .pressure = pressure,
                        .balance = balance_with_weight(f)};

    for (size_t i = 0; i < f->port_count; i++) {
        kent_port_state *s = &out.balance.port[i];
        if (ports[i].kind != KENT_PORT_OUTLET && (only < 0 || (size_t)only == i)) {
            s->pressure = pressure + pressure_below_centre(m, f, &ports[i]);
        }
        s->momentum_factor = kent_port_momentum_factor(m, &ports[i], 0.0);
    }
    kent_balance_sum(ports, f->port_count, m->water.density, &out.balance);
    return out;
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
