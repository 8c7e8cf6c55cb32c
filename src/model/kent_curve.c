#include "kent_joining.h"

#include <math.h>

#include "kent_said.h"

/* Tangents that just meet may overlap by this, as stations are rounded: 0.05 m. */
static const double TANGENT_ROUNDING = 0.05;
/* Two pipes of the usual 6 m, where pipe_length is not known (common practice, no
 * source). */
static const double USUAL_TWO_PIPES = 12.0;
/* Turns whose axes differ by less go the same way: cosine of 30 degrees. */
static const double SAME_SENSE = 0.86602540378443865;

/* ---- curves by radius ------------------------------------------------------------ */

/* Why a curve cannot lie at a point; NULL: it can. */
static const char *misplaced(const kent_layout *l, const kent_model *m, int point)
{
    if (l->first[point + 1] - l->first[point] != 1 ||
        !kent_layout_runs_through(m, l, l->stop[l->first[point]])) {
        return "a curve lies in the course of one pipe, where no other pipe meets it: "
               "name a point inside its route";
    }
    if (l->device[point].kind != KENT_SEAT_FREE || l->beside[point]) {
        return "a device stands there, which is no place for a curve: give it a point "
               "of its own";
    }
    return NULL;
}

void kent_curve_check(const kent_model *m, const kent_layout *l,
                      kent_complaints *complaints)
{
    for (size_t p = 0; p < m->point_count; p++) {
        const kent_point *point = &m->points[p];
        if (isnan(point->curve_radius) || l->first[p + 1] == l->first[p]) continue;
        const char *wrong = misplaced(l, m, (int)p);
        if (!wrong) continue;
        kent_place_complain(m, point->place, complaints,
                            "point \"%s\": curve_radius: %s", point->id, wrong);
    }
}

/* rad in space, of a route at a point inside it. */
static double turn_at(const kent_model *m, size_t stop)
{
    const kent_vec3 here = m->points[m->route[stop]].at;
    return kent_vec3_angle(kent_vec3_sub(here, m->points[m->route[stop - 1]].at),
                           kent_vec3_sub(m->points[m->route[stop + 1]].at, here));
}

/* m: tangent and arc at a stop, 0 where the route only turns. Equation 5.11. */
static bool tangent_at(const kent_model *m, const kent_pipe *pipe, size_t stop,
                       double *tangent, double *arc, kent_complaints *complaints)
{
    const kent_point *point = &m->points[m->route[stop]];
    *tangent = *arc = 0.0;
    if (isnan(point->curve_radius) ||
        stop + 1 == pipe->route_first + pipe->route_count) {
        return true;
    }
    const double turn = turn_at(m, stop);
    if (turn <= KENT_LEAST_TURN) {
        kent_place_complain(m, point->place, complaints,
                            "point \"%s\": curve_radius: the route runs straight on "
                            "there; leave it out, or correct the points",
                            point->id);
        return false;
    }
    *tangent = point->curve_radius * tan(0.5 * turn);
    *arc = point->curve_radius * turn;
    return true;
}

static bool complain_overlap(const kent_model *m, size_t stop, double tangents,
                             double leg, kent_complaints *complaints)
{
    const kent_point *point = &m->points[m->route[stop]];
    const kent_point *before = &m->points[m->route[stop - 1]];
    const kent_point *at = isnan(point->curve_radius) ? before : point;
    kent_place_complain(
        m, at->place, complaints,
        "point \"%s\": curve_radius: between \"%s\" and \"%s\" there are "
        "%s, and the tangents of the curves there take %s; a smaller "
        "radius would fit",
        at->id, before->id, point->id, kent_said_of(KENT_LENGTH, m->units, leg).s,
        kent_said_of(KENT_LENGTH, m->units, tangents).s);
    return false;
}

/* Equation 5.12. */
bool kent_curve_follow(const kent_model *m, const kent_layout *l, const kent_pipe *pipe,
                       kent_complaints *complaints)
{
    double given = 0.0; /* m: chainage of the stop before, along tangents */
    double tangent = 0.0, arc = 0.0; /* m, of the stop before */
    for (size_t k = 1; k < pipe->route_count; k++) {
        const size_t stop = pipe->route_first + k;
        const double leg = m->chainage[stop] - given;
        double next_tangent = 0.0, next_arc = 0.0;
        if (!tangent_at(m, pipe, stop, &next_tangent, &next_arc, complaints)) {
            return false;
        }
        const double tangents = tangent + next_tangent;
        if (leg < tangents - TANGENT_ROUNDING) {
            return complain_overlap(m, stop, tangents, leg, complaints);
        }
        given = m->chainage[stop];
        m->chainage[stop] =
            m->chainage[stop - 1] + leg - tangents + 0.5 * (arc + next_arc);
        l->arc[stop] = next_arc;
        tangent = next_tangent;
        arc = next_arc;
    }
    return true;
}

void kent_curve_caution(kent_model *m, const kent_fitting *f, const kent_pipe *pipe)
{
    const double limit = pipe->joint_deflection;
    if (!(limit > 0.0) || isnan(pipe->laying_length)) return;
    if (pipe->laying_length / f->curve_radius <= limit) return; /* equation 5.13 */
    kent_notes_add(&m->cautions,
                   "the curve at \"%s\" asks more of each joint than it takes: with "
                   "pipes of %s the radius must be at least %s",
                   f->id, kent_said_of(KENT_LENGTH, m->units, pipe->laying_length).s,
                   kent_said_of(KENT_LENGTH, m->units, pipe->laying_length / limit).s);
}

/* ---- curves of joints that turn one after another -------------------------------- */

static bool may_curve(const kent_joining *j, int fitting)
{
    const kent_fitting *f = &j->m->fittings[fitting];
    const int note = f->point >= 0 ? j->l->note[f->point] : -1;
    return f->type == KENT_BEND && f->within_deflection &&
           !(note >= 0 && j->m->notes[note].apart);
}

static int pipe_of(const kent_model *m, const kent_port *port)
{
    return m->spans[port->span].pipe;
}

/* Unit, about which a bend turns. */
static kent_vec3 axis_of(const kent_model *m, const kent_fitting *f)
{
    const kent_port *ports = &m->ports[f->port_first];
    return kent_vec3_unit(
        kent_vec3_cross(kent_vec3_scale(-1.0, ports[0].direction), ports[1].direction));
}

static void string_joints(kent_joining *j)
{
    const kent_model *m = j->m;
    for (size_t f = 0; f < m->fitting_count; f++) {
        if (!may_curve(j, (int)f)) continue;
        const size_t out = m->fittings[f].port_first + 1;
        const int pipe = pipe_of(m, &m->ports[out]);
        const double laying = m->pipes[pipe].laying_length;
        const double reach = isnan(laying) ? USUAL_TWO_PIPES : 2.0 * laying;
        kent_way way;
        if (!kent_joining_way(j, (int)f, out, (double)INFINITY, reach, &way)) continue;
        if (!may_curve(j, way.fitting) || way.fitting <= (int)f) continue;
        if (pipe_of(m, &m->ports[way.port]) != pipe) continue;
        const double same = kent_vec3_dot(axis_of(m, &m->fittings[f]),
                                          axis_of(m, &m->fittings[way.fitting]));
        if (same >= SAME_SENSE) kent_joining_unite(j, (int)f, way.fitting);
    }
}

/* Equation 5.14: n joints stand for n lengths between them. */
static bool sum_up(const kent_joining *j, int root, kent_fitting *out, kent_port *ports,
                   kent_complaints *complaints)
{
    const kent_model *m = j->m;
    const kent_fitting *first = &m->fittings[root], *last = first;
    double count = 0.0;
    (void)complaints; /* nothing can be wrong with them */

    *out = *first;
    out->angle = out->plan_turn = 0.0;
    out->at = (kent_vec3){0.0, 0.0, 0.0};
    for (int f = root; f >= 0; f = j->next[f]) {
        last = &m->fittings[f];
        count += 1.0;
        out->angle += last->angle;
        out->plan_turn += last->plan_turn;
        out->at = kent_vec3_add(out->at, last->at);
    }
    out->at = kent_vec3_scale(1.0 / count, out->at);
    ports[0] = m->ports[first->port_first];
    ports[1] = m->ports[last->port_first + 1];
    ports[0].level = first->at.z;
    ports[1].level = last->at.z;
    const double from = m->chainage[m->spans[ports[0].span].route_first];
    const double to = m->chainage[m->spans[ports[1].span].route_first];
    const double between = to + ports[1].chainage - from - ports[0].chainage;
    out->type = KENT_CURVE;
    out->port_count = 2;
    out->within_deflection = false;
    out->orientation = kent_ports_orientation(ports);
    out->curve_length = between * count / (count - 1.0);
    out->curve_radius = out->curve_length / out->angle;
    return true;
}

kent_status kent_curve_joints(kent_model *m, const kent_layout *l,
                              kent_complaints *complaints)
{
    kent_joining j = {0};
    kent_status status = kent_joining_start(&j, m, l);
    if (status == KENT_OK) {
        string_joints(&j);
        status = kent_joining_finish(&j, sum_up, complaints);
    }
    kent_joining_clear(&j);
    return status;
}
