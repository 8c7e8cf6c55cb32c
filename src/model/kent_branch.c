#include "kent_model_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
/* A branch nearer to a leg than this lies along it: 15 degrees. */
static const double LEAST_OPENING = 15.0 * 3.14159265358979323846 / 180.0;

static bool complain(const kent_model *m, const kent_fitting_note *note,
                     kent_complaints *complaints, const char *what)
{
    kent_place_complain(m, note->place, complaints, "fitting at \"%s\": %s",
                        m->points[note->point].id, what);
    return false;
}

bool kent_branch_stands(const kent_model *m, const kent_fitting_note *note,
                        kent_seat device, size_t legs, kent_complaints *complaints)
{
    const bool branch = note->branch.end != KENT_BRANCH_NONE;
    const bool in_line = kent_role_on_run(note->role);
    const bool served = note->role != KENT_ROLE_NONE && !in_line;
    const bool end = note->role == KENT_ROLE_HYDRANT && legs == 1;

    const bool pump = device.kind == KENT_SEAT_DEVICE &&
                      m->devices[device.index].kind == KENT_DEVICE_PUMP;

    if (in_line && (pump || device.kind == KENT_SEAT_LEVEL)) {
        kent_place_complain(m, note->place, complaints,
                            "fitting at \"%s\": a %s stands there; give the %s a point "
                            "of its own on the pipe",
                            m->points[note->point].id, pump ? "pump" : "fixed level",
                            kent_role_word(note->role));
        return false;
    }
    if (!branch && !served) return true;
    if (device.kind == KENT_SEAT_VALVE) {
        return complain(m, note, complaints,
                        "a valve stands there; give what branches off a point of its "
                        "own on the pipe");
    }
    if (device.kind == KENT_SEAT_DEVICE) {
        return complain(m, note, complaints,
                        "a pump or valve stands there; give what branches off a point "
                        "of its own on the pipe");
    }
    if (device.kind == KENT_SEAT_LEVEL) {
        return complain(m, note, complaints,
                        "a fixed level stands there; give what branches off a point "
                        "of its own on the pipe");
    }
    if (served && !branch && legs < 3 && !end) {
        kent_place_complain(
            m, note->place, complaints,
            "fitting at \"%s\": a %s needs its branch: add branch = { "
            "outside_diameter = ...; end = \"valve\"; }, or lead a pipe "
            "off from there",
            m->points[note->point].id, kent_role_word(note->role));
        return false;
    }
    if (note->branch.end == KENT_BRANCH_OPEN && device.kind != KENT_SEAT_OUTFLOW) {
        kent_place_complain(m, note->place, complaints,
                            "fitting at \"%s\": its branch is open, but nothing is "
                            "drawn there; add an outflow at \"%s\", or end the branch "
                            "with \"valve\" or \"blank\"",
                            m->points[note->point].id, m->points[note->point].id);
        return false;
    }
    return true;
}

/* Level and to the left of the flow, at an angle with the way it goes on. */
static kent_vec3 to_the_left(const kent_port *ports, size_t legs, double angle)
{
    const kent_vec3 on =
        legs > 1 ? ports[1].direction : kent_vec3_scale(-1.0, ports[0].direction);
    const kent_vec3 left = kent_vec3_unit((kent_vec3){-on.y, on.x, 0.0});
    return kent_vec3_add(kent_vec3_scale(cos(angle), on),
                         kent_vec3_scale(sin(angle), left));
}

bool kent_branch_direct(const kent_model *m, const kent_fitting_note *note,
                        const kent_port *ports, size_t legs, bool surveyed,
                        kent_vec3 *out, kent_complaints *complaints)
{
    const kent_vec3 given = note->branch.direction;
    const char *id = m->points[note->point].id;
    const double angle = isfinite(note->angle) ? note->angle : 0.5 * PI;

    if (isfinite(given.x + given.y + given.z)) {
        *out = kent_vec3_unit(given);
        if (!(kent_vec3_length(*out) > 0.0)) {
            return complain(m, note, complaints,
                            "its branch has no direction; write for instance "
                            "direction = [ 0.0, 1.0, 0.0 ]");
        }
    } else if (note->role == KENT_ROLE_AIR_VALVE || note->role == KENT_ROLE_MANHOLE) {
        *out = (kent_vec3){0.0, 0.0, 1.0};
    } else if (surveyed) {
        const kent_vec3 left = to_the_left(ports, legs, 0.5 * PI);
        kent_place_complain(m, note->place, complaints,
                            "fitting at \"%s\": with x and y there, its branch needs "
                            "its direction; to the left of the flow it is direction = "
                            "[ %.3f, %.3f, %.3f ]",
                            id, left.x, left.y, left.z);
        return false;
    } else {
        *out = to_the_left(ports, legs, angle);
    }
    for (size_t i = 0; i < legs; i++) {
        if (kent_vec3_angle(*out, ports[i].direction) > LEAST_OPENING) continue;
        kent_place_complain(m, note->place, complaints,
                            "fitting at \"%s\": its branch lies within 15° of the pipe "
                            "towards \"%s\"; state a direction that leads off",
                            id, m->points[ports[i].toward].id);
        return false;
    }
    return true;
}

bool kent_branch_port(const kent_model *m, const kent_branch *branch, kent_port *out)
{
    const bool slips = kent_joint_slips(branch->joint);
    const bool gasketed = slips || branch->joint == KENT_RESTRAINED;

    if (branch->end == KENT_BRANCH_NONE) return false;
    if (branch->end != KENT_BRANCH_OPEN && !slips) return false;
    *out = kent_port_blank();
    out->kind = branch->end == KENT_BRANCH_OPEN ? KENT_PORT_OUTLET : KENT_PORT_STUB;
    out->direction = branch->direction;
    out->inside_diameter = branch->inside_diameter;
    out->outside_diameter = branch->outside_diameter;
    out->seal_diameter = gasketed
                             ? kent_seal_diameter(m, branch->outside_diameter,
                                                  branch->inside_diameter, (double)NAN)
                             : branch->inside_diameter;
    out->sign = 1.0;
    return true;
}
