#include "kent_fitting_internal.h"

#include <math.h>
#include <stdio.h>

static const double PI = 3.14159265358979323846;

enum { NO_FITTING = -1 };

/* A point with its legs, while it is being looked at. */
typedef struct kent_site {
    kent_model *m;
    int point;
    kent_seat device;
    const kent_fitting_note *note; /* NULL: nothing said */
    kent_complaints *complaints;
    kent_port *ports; /* [count] at most KENT_ARMS are kept */
    size_t count;
    kent_branch branch; /* end NONE: none */
    bool curved;        /* the pipe follows an arc */
    bool schematic;     /* some leg has no coordinates */
    double deflection;  /* rad that the joints here take: the least of the legs' */
    bool rigid;         /* no leg's joint slips */
} kent_site;

static double degrees(double angle) { return angle * 180.0 / PI; }

/* The leg that one arm gives, direction apart. */
static kent_port port_of(const kent_model *m, const kent_layout *l, kent_arm arm)
{
    const kent_pipe *pipe = &m->pipes[l->pipe[arm.stop]];
    const int number = l->arm_span[kent_arm_number(arm)];
    const kent_span *span = &m->spans[number];
    const bool gasketed =
        pipe->joint == KENT_RESTRAINED || kent_joint_slips(pipe->joint);
    const double outside = pipe->outside_diameter;

    return (kent_port){
        .inside_diameter = pipe->inside_diameter,
        .seal_diameter = gasketed
                             ? kent_seal_diameter(m, outside, pipe->inside_diameter,
                                                  pipe->nominal_size)
                             : pipe->inside_diameter,
        .outside_diameter = outside,
        .level = (double)NAN,
        .momentum_factor = (double)NAN,
        .span = number,
        .chainage = m->chainage[arm.stop] - m->chainage[span->route_first],
        .sign = arm.leaves ? 1.0 : -1.0,
        .toward = kent_arm_toward(m, arm),
    };
}

static void read_site(const kent_layout *l, kent_site *site)
{
    const kent_model *m = site->m;
    const kent_vec3 here = m->points[site->point].at;
    kent_arm arms[KENT_ARMS];
    bool some_plan = false;

    site->count = kent_layout_arms(m, l, site->point, arms);
    site->device = l->device[site->point];
    site->curved = !isnan(m->points[site->point].curve_radius);
    site->deflection = (double)INFINITY;
    site->rigid = true;
    for (size_t i = 0; i < site->count && i < KENT_ARMS; i++) {
        const kent_pipe *pipe = &m->pipes[l->pipe[arms[i].stop]];
        kent_port *port = &site->ports[i];
        *port = port_of(m, l, arms[i]);
        port->direction =
            kent_vec3_unit(kent_vec3_sub(m->points[port->toward].at, here));
        const bool plan = isfinite(kent_vec3_length(port->direction));
        some_plan |= plan;
        site->schematic |= !plan;
        site->deflection = fmin(site->deflection, pipe->joint_deflection);
        site->rigid &= !kent_joint_slips(pipe->joint);
        if (site->note && isfinite(site->note->face)) port->face = site->note->face;
    }
    if (site->schematic && some_plan && site->count > 1) {
        kent_notes_add(&site->m->cautions,
                       "point \"%s\": not every pipe there has coordinates, so none of "
                       "its angles are taken from them%s",
                       m->points[site->point].id,
                       m->points[site->point].laid_out
                           ? "; give the pipe that branches off there its branch_turn"
                           : "");
    }
}

/* A branch without coordinates: the one smaller leg, else the pipe listed last. */
static void put_branch_last(kent_port ports[3])
{
    size_t branch = 2;
    for (size_t i = 0; i < 3; i++) {
        const kent_port *a = &ports[(i + 1) % 3], *b = &ports[(i + 2) % 3];
        if (ports[i].inside_diameter < fmin(a->inside_diameter, b->inside_diameter)) {
            branch = i;
        }
    }
    const kent_port leg = ports[branch];
    for (size_t i = branch; i < 2; i++) {
        ports[i] = ports[i + 1];
    }
    ports[2] = leg;
}

/* Of the third leg, or of the branch without a pipe on a run. */
static double branch_angle_of(const kent_site *site)
{
    if (site->count == 2) {
        return fmin(kent_vec3_angle(site->branch.direction, site->ports[0].direction),
                    kent_vec3_angle(site->branch.direction, site->ports[1].direction));
    }
    if (!site->schematic) return kent_ports_branch_angle(site->ports);
    return site->note && isfinite(site->note->angle) ? site->note->angle : 0.5 * PI;
}

/* Orders the legs of three and more: run first, upstream first. */
static void order_legs(kent_site *site)
{
    if (site->count < 3 || site->count > KENT_ARMS) return;
    if (!site->schematic) kent_ports_run_first(site->ports, site->count);
    if (site->schematic && site->count == 3) put_branch_last(site->ports);
    if (site->ports[0].sign > 0.0 && site->ports[1].sign < 0.0) {
        const kent_port upstream = site->ports[1];
        site->ports[1] = site->ports[0];
        site->ports[0] = upstream;
    }
}

/* The device in line or at the end; NULL: none. */
static const kent_device *device_of(const kent_site *site)
{
    return site->device.kind == KENT_SEAT_DEVICE ? &site->m->devices[site->device.index]
                                                 : NULL;
}

/* Whether something there closes against pressure. */
static bool is_valve(const kent_site *site)
{
    const kent_device *d = device_of(site);
    return site->device.kind == KENT_SEAT_VALVE || (d && d->kind != KENT_DEVICE_PUMP);
}

/* A pump in line with check valves is one where a note says so. */
static bool may_be_valve(const kent_site *site)
{
    const kent_device *d = device_of(site);
    return is_valve(site) || (d && d->node[0] >= 0 &&
                              site->m->pumps[d->index].check_valve != KENT_CHECK_NONE);
}

/* Whether it is listed for what it is on the main, whatever the geometry. */
static bool is_named_in_line(const kent_site *site)
{
    return site->note && kent_role_on_run(site->note->role);
}

/* What geometry and devices make of a point. */
static int natural_type(const kent_site *site)
{
    const kent_seat_kind device = site->device.kind;
    if (is_valve(site)) return KENT_VALVE;
    if (device == KENT_SEAT_LEVEL) return NO_FITTING;  /* the pipe ends in a tank */
    if (device == KENT_SEAT_DEVICE) return NO_FITTING; /* a pump, held by its base */
    const bool branch = site->branch.end != KENT_BRANCH_NONE;
    const bool hydrant = site->note && site->note->role == KENT_ROLE_HYDRANT;
    const bool in_line = is_named_in_line(site);
    if (site->count == 1) {
        const bool end = device != KENT_SEAT_OUTFLOW || branch || hydrant || in_line;
        return end ? (int)KENT_DEAD_END : (int)NO_FITTING;
    }
    if (site->curved) return KENT_CURVE; /* kent_curve_check saw to its legs */
    if (site->count == 2 && !branch) {
        if (!kent_ports_same_size(&site->ports[0], &site->ports[1])) {
            return KENT_REDUCER;
        }
        const double turn = site->schematic ? (site->note ? site->note->angle : 0.0)
                                            : kent_ports_turn(site->ports);
        if (turn > KENT_LEAST_TURN) return KENT_BEND; /* NAN: none */
        return in_line ? (int)KENT_STRAIGHT : (int)NO_FITTING;
    }
    if (site->count + branch == 3) {
        return branch_angle_of(site) < KENT_WYE_BELOW ? KENT_WYE : KENT_TEE;
    }
    return KENT_CROSS;
}

/* Direction and bore of a branch without a pipe, before the type goes by them. */
static bool settle_branch(kent_site *site)
{
    const kent_fitting_note *note = site->note;
    if (!note) return true;
    if (!kent_branch_stands(site->m, note, site->device, site->count,
                            site->complaints)) {
        return false;
    }
    if (note->branch.end == KENT_BRANCH_NONE || site->count >= KENT_ARMS) return true;
    if (site->schematic) {
        const double angle = site->count > 2 ? note->angle : 0.0;
        kent_ports_schematic(site->ports, site->count, angle, KENT_HORIZONTAL);
    }
    site->branch = note->branch;
    if (isnan(site->branch.inside_diameter)) {
        site->branch.inside_diameter = site->branch.outside_diameter;
    }
    const bool surveyed = !site->schematic && !site->m->points[site->point].laid_out;
    return kent_branch_direct(site->m, note, site->ports, site->count, surveyed,
                              &site->branch.direction, site->complaints);
}

/* The type after the note's say; NO_FITTING with a complaint where a note cannot be
 * followed. */
static int settle_type(const kent_site *site)
{
    const kent_model *m = site->m;
    const kent_fitting_note *note = site->note;
    const char *id = m->points[site->point].id;
    int type = natural_type(site);

    if (!note) return type;
    if (site->curved && (note->type >= 0 || note->branch.end != KENT_BRANCH_NONE)) {
        kent_place_complain(m, note->place, site->complaints,
                            "fitting at \"%s\": the pipe follows a curve there; leave "
                            "type and branch out, or the point's curve_radius",
                            id);
        return NO_FITTING;
    }
    if (note->type < 0) {
        if (type == NO_FITTING) {
            kent_place_complain(
                m, note->place, site->complaints,
                "fitting at \"%s\": nothing turns, changes size or ends "
                "there; state its type (without x and y, a bend's "
                "angle)",
                id);
        }
        return type;
    }
    const kent_fitting_type asked = (kent_fitting_type)note->type;
    if (asked == KENT_VALVE ? !may_be_valve(site) : is_valve(site)) {
        kent_place_complain(m, note->place, site->complaints,
                            is_valve(site)
                                ? "fitting at \"%s\": a valve stands there; "
                                  "leave its type out"
                                : "fitting at \"%s\": no valve stands there; "
                                  "add one to valves",
                            id);
        return NO_FITTING;
    }
    if (device_of(site) && site->count == 2 && asked != KENT_VALVE) {
        kent_place_complain(m, note->place, site->complaints,
                            "fitting at \"%s\": a pump stands there; its type may be "
                            "\"valve\", for its check valve, or be left out",
                            id);
        return NO_FITTING;
    }
    if (!kent_fitting_type_fits(asked, site->count,
                                site->branch.end != KENT_BRANCH_NONE)) {
        kent_place_complain(m, note->place, site->complaints,
                            "fitting at \"%s\": %zu leg%s there cannot be a %s; leave "
                            "its type out, or correct the routes",
                            id, site->count, site->count == 1 ? "" : "s",
                            kent_fitting_type_word(asked));
        return NO_FITTING;
    }
    return note->type;
}

/* Angle and orientation said in a note: directions where there are no coordinates,
 * else only what agrees with them. Returns false with a complaint. */
static bool settle_directions(const kent_site *site, kent_fitting_type type)
{
    const kent_fitting_note *note = site->note;
    const bool says_angle = note && isfinite(note->angle);
    const bool says_way = note && note->orientation >= 0;
    const bool extra = site->branch.end != KENT_BRANCH_NONE;
    const bool branches =
        extra || type == KENT_TEE || type == KENT_WYE || type == KENT_CROSS;
    const bool laid = site->m->points[site->point].laid_out;
    const char *wrong = NULL;

    if (!site->schematic) {
        if (says_angle) {
            wrong = laid ? "angle is for points without stations and turns: here they "
                           "give it; leave it out"
                         : "angle is for points without x and y: here coordinates give "
                           "it; leave it out";
        } else if (says_way) {
            wrong = laid
                        ? "orientation is for points without stations and turns: here "
                          "turn and z give it; leave it out"
                        : "orientation is for points without x and y: here coordinates "
                          "give it; leave it out";
        }
    } else if (type == KENT_BEND && !says_angle) {
        wrong = "a bend without x and y needs its angle";
    } else if (says_angle && type != KENT_BEND && !branches) {
        wrong = "angle belongs to a bend or to a branch; leave it out";
    } else if (says_way && type != KENT_BEND) {
        wrong = "orientation belongs to a bend; leave it out";
    } else if (says_way && note->orientation == KENT_COMBINED) {
        wrong = "a combined bend needs x and y, or its own ports";
    }
    if (wrong) {
        kent_place_complain(site->m, note ? note->place : (kent_place){-1, 0},
                            site->complaints, "fitting at \"%s\": %s",
                            site->m->points[site->point].id, wrong);
        return false;
    }
    if (site->schematic && !extra) {
        const double angle = says_angle ? note->angle : branches ? 0.5 * PI : 0.0;
        kent_ports_schematic(site->ports, site->count, angle,
                             says_way ? (kent_orientation)note->orientation
                                      : KENT_HORIZONTAL);
    }
    return true;
}

/* The zone that a point lies in, on the pipe whose stations it has before others; -1.
 */
static int zone_of(const kent_model *m, const kent_layout *l, int point)
{
    const size_t owner = l->owner[point];
    int zone = kent_zone_at(m, l->pipe[owner], m->station[owner]);
    for (size_t i = l->first[point]; zone < 0 && i < l->first[point + 1]; i++) {
        const size_t stop = l->stop[i];
        const bool start = stop == m->pipes[l->pipe[stop]].route_first;
        zone = kent_zone_at(m, l->pipe[stop],
                            start ? m->station_on[stop] : m->station[stop]);
    }
    return zone;
}

static void caution_turning(const kent_site *site, const kent_fitting *f)
{
    if (site->count != 2 || site->schematic || site->curved || f->type == KENT_BEND) {
        return;
    }
    const double turn = kent_ports_turn(site->ports);
    if (turn <= fmax(KENT_LEAST_TURN, site->deflection)) return;
    kent_notes_add(&site->m->cautions,
                   "%s at \"%s\" also turns by %.1f°: its thrust takes that in",
                   kent_fitting_type_word(f->type), f->id, degrees(turn));
}

/* The force that pulls at the fitting pushes such an end off as well. */
static void caution_cap(const kent_site *site)
{
    if (site->branch.end == KENT_BRANCH_OPEN || !kent_joint_slips(site->branch.joint)) {
        return;
    }
    kent_notes_add(&site->m->cautions,
                   "branch at \"%s\" ends on a %s joint: the thrust there pushes its "
                   "end off as well, which needs a block of its own or a joint that "
                   "holds",
                   site->m->points[site->point].id,
                   kent_joint_word(site->branch.joint));
}

bool kent_fitting_at(kent_model *m, const kent_layout *l, int point,
                     const kent_fitting_note *note, kent_fitting *out, kent_port *ports,
                     kent_complaints *complaints)
{
    kent_site site = {
        .m = m, .point = point, .note = note, .complaints = complaints, .ports = ports};
    read_site(l, &site);
    order_legs(&site);
    if (!settle_branch(&site)) return false;
    const int type = settle_type(&site);
    if (type == NO_FITTING) return false;
    if (site.count > KENT_ARMS ||
        (site.count == KENT_ARMS && note && note->branch.end != KENT_BRANCH_NONE)) {
        kent_place_complain(m, m->points[point].place, complaints,
                            "point \"%s\": %zu legs meet there; a fitting has at most "
                            "%d, so spread them over several points",
                            m->points[point].id, site.count, KENT_ARMS);
        return false;
    }
    if (!settle_directions(&site, (kent_fitting_type)type)) return false;

    *out = (kent_fitting){
        .point = point,
        .type = (kent_fitting_type)type,
        .at = m->points[point].at,
        .station = l->station[point],
        .valve = site.device.kind == KENT_SEAT_VALVE ? site.device.index : -1,
        .device = type == KENT_VALVE && device_of(&site) ? site.device.index : -1,
        .curve_radius = (double)NAN,
        .curve_length = (double)NAN,
        .zone = zone_of(m, l, point),
        .role = note ? note->role : KENT_ROLE_NONE,
        .branch = site.branch,
        .obstacle_first = note ? note->obstacle_first : 0,
        .obstacle_count = note ? note->obstacle_count : 0,
        .port_count = site.count,
        .place = note ? note->place : m->points[point].place};
    (void)snprintf(out->id, sizeof out->id, "%s", m->points[point].id);
    kent_fitting_describe_legs(out, ports, site.count);
    if (site.branch.end != KENT_BRANCH_NONE) {
        if (site.count == 2) out->angle = branch_angle_of(&site);
        if (kent_branch_port(m, &site.branch, &ports[site.count])) out->port_count++;
        caution_cap(&site);
    }
    if (site.curved) {
        out->curve_radius = m->points[point].curve_radius;
        out->curve_length = l->arc[l->owner[point]];
        kent_curve_caution(m, out, &m->pipes[l->pipe[l->owner[point]]]);
    }
    kent_fitting_describe_ground(m, note, out);
    if (!kent_stated_settle(m, note, out, ports, complaints)) return false;
    /* A bend named as one is a casting; one found by its small turn is a joint. */
    out->within_deflection = type == KENT_BEND && !(note && note->type >= 0) &&
                             !site.schematic && out->angle <= site.deflection;
    out->restraint = note && note->restraint >= 0
                         ? (kent_restraint_choice)note->restraint
                         : kent_fitting_usual_restraint(out, site.rigid);
    caution_turning(&site, out);
    return true;
}
