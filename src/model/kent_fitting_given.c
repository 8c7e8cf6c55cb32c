/* A fitting stated by its ports alone. */
#include "kent_fitting_internal.h"

#include <math.h>
#include <stdio.h>

static const double FLOW_BALANCE = 1.0e-6; /* of the largest flow */

/* Copies the legs a case states, with defaults; complains of what cannot be. */
static bool copy_given(const kent_model *m, const kent_fitting_note *note,
                       kent_port *ports, kent_complaints *complaints)
{
    double net = 0.0, largest = 0.0;
    if (note->port_count > KENT_ARMS) {
        kent_place_complain(m, note->place, complaints,
                            "fitting \"%s\" has %zu ports; at most %d are known",
                            note->id, note->port_count, KENT_ARMS);
        return false;
    }
    for (size_t i = 0; i < note->port_count; i++) {
        kent_port *port = &ports[i];
        *port = m->given_ports[note->port_first + i];
        port->kind = KENT_PORT_GIVEN;
        port->span = port->toward = -1;
        port->sign = 1.0;
        if (!(kent_vec3_length(port->direction) > 0.0)) {
            kent_place_complain(m, note->place, complaints,
                                "fitting \"%s\": port %zu has no direction; write for "
                                "instance direction = [ 1.0, 0.0, 0.0 ]",
                                note->id, i + 1);
            return false;
        }
        port->direction = kent_vec3_unit(port->direction);
        if (isnan(port->seal_diameter)) {
            port->seal_diameter = kent_seal_diameter(
                m, port->outside_diameter, port->inside_diameter, (double)NAN);
        }
        net += port->flow;
        largest = fmax(largest, fabs(port->flow));
    }
    if (fabs(net) <= FLOW_BALANCE * largest) return true; /* NaN falls through */
    kent_place_complain(m, note->place, complaints,
                        "fitting \"%s\": its flows, positive outwards, add up to %.6g "
                        "m3/s instead of nothing; what comes in must go out",
                        note->id, net);
    return false;
}

static kent_fitting_type type_of_ports(const kent_port *ports, size_t count)
{
    if (count == 1) return KENT_DEAD_END;
    if (count == 3) {
        return kent_ports_branch_angle(ports) < KENT_WYE_BELOW ? KENT_WYE : KENT_TEE;
    }
    if (count > 3) return KENT_CROSS;
    if (kent_ports_turn(ports) > KENT_LEAST_TURN) return KENT_BEND;
    return kent_ports_same_size(&ports[0], &ports[1]) ? KENT_STRAIGHT : KENT_REDUCER;
}

bool kent_fitting_from_ports(const kent_model *m, const kent_fitting_note *note,
                             kent_fitting *out, kent_port *ports,
                             kent_complaints *complaints)
{
    if (note->point >= 0) {
        kent_place_complain(m, note->place, complaints,
                            "fitting \"%s\" has both at and ports; keep one of them",
                            note->id);
        return false;
    }
    if (!copy_given(m, note, ports, complaints)) return false;
    if (note->port_count >= 3) kent_ports_run_first(ports, note->port_count);
    const kent_fitting_type type = note->type >= 0
                                       ? (kent_fitting_type)note->type
                                       : type_of_ports(ports, note->port_count);
    if (!kent_fitting_type_fits(type, note->port_count, 0)) {
        kent_place_complain(m, note->place, complaints,
                            "fitting \"%s\": a %s does not have %zu port%s", note->id,
                            kent_fitting_type_word(type), note->port_count,
                            note->port_count == 1 ? "" : "s");
        return false;
    }
    const double nan = (double)NAN;
    *out = (kent_fitting){.point = -1,
                          .type = type,
                          .at = {nan, nan, nan},
                          .station = nan,
                          .valve = -1,
                          .device = -1,
                          .curve_radius = nan,
                          .curve_length = nan,
                          .zone = -1,
                          .role = note->role,
                          .stated = note->stated,
                          .obstacle_first = note->obstacle_first,
                          .obstacle_count = note->obstacle_count,
                          .port_count = note->port_count,
                          .place = note->place};
    (void)snprintf(out->id, sizeof out->id, "%s", note->id);
    kent_fitting_describe_legs(out, ports, note->port_count);
    kent_fitting_describe_ground(m, note, out);
    out->restraint = note->restraint >= 0 ? (kent_restraint_choice)note->restraint
                                          : kent_fitting_usual_restraint(out, false);
    return true;
}
