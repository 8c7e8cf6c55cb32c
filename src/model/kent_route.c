#include "kent_model_internal.h"

#include "kent_said.h"

#include <math.h>

/* A given length further from the coordinates than this is worth saying: 1 %. */
static const double LENGTH_TOLERANCE = 0.01;

static bool has_plan(const kent_point *p) { return isfinite(p->at.x + p->at.y); }

static kent_vec3 at(const kent_model *m, size_t stop)
{
    return m->points[m->route[stop]].at;
}

/* Whether the pipe's points all have x and y. */
static bool is_surveyed(const kent_model *m, const kent_pipe *pipe)
{
    for (size_t k = 0; k < pipe->route_count; k++) {
        if (!has_plan(&m->points[m->route[pipe->route_first + k]])) return false;
    }
    return true;
}

static void measure_without_plan(kent_model *m, const kent_pipe *pipe,
                                 kent_complaints *complaints)
{
    if (pipe->route_count > 2) {
        kent_place_complain(m, pipe->place, complaints,
                            "pipe \"%s\" runs through %zu points, not all with x and "
                            "y; give all x and y, or none and a station at each (with "
                            "turn where it turns), or write one pipe with its length "
                            "between each two",
                            pipe->id, pipe->route_count);
    } else if (isnan(pipe->length)) {
        kent_place_complain(m, pipe->place, complaints,
                            "pipe \"%s\" has no length; give length, or x and y, or "
                            "stations, of both its points",
                            pipe->id);
    } else {
        m->chainage[pipe->route_first + 1] = pipe->length;
    }
}

/* Equation 5.1: lengths in space, stretched to the given length where there is one. */
static void measure_surveyed(kent_model *m, const kent_layout *l, const kent_pipe *pipe,
                             kent_complaints *complaints)
{
    double *chainage = m->chainage + pipe->route_first;
    for (size_t k = 1; k < pipe->route_count; k++) {
        const size_t stop = pipe->route_first + k;
        const double leg =
            kent_vec3_length(kent_vec3_sub(at(m, stop), at(m, stop - 1)));
        if (!(leg > 0.0)) {
            kent_place_complain(m, pipe->place, complaints,
                                "pipe \"%s\": points \"%s\" and \"%s\" lie at the same "
                                "place; leave one out of its route",
                                pipe->id, m->points[m->route[stop - 1]].id,
                                m->points[m->route[stop]].id);
            return;
        }
        chainage[k] = chainage[k - 1] + leg;
    }
    if (!kent_curve_follow(m, l, pipe, complaints)) return;
    if (isnan(pipe->length)) return;

    const double survey = chainage[pipe->route_count - 1];
    const double stretch = pipe->length / survey;
    if (fabs(stretch - 1.0) > LENGTH_TOLERANCE) {
        kent_notes_add(&m->cautions,
                       "pipe \"%s\": its length is %.1f %% %s than its coordinates "
                       "make it; the length governs the hydraulics, the coordinates "
                       "the angles",
                       pipe->id, 100.0 * fabs(stretch - 1.0),
                       stretch > 1.0 ? "more" : "less");
    }
    for (size_t k = 1; k < pipe->route_count; k++) {
        chainage[k] *= stretch;
    }
    chainage[pipe->route_count - 1] = pipe->length; /* to the last bit */
}

/* What the reader's own ranges let through only in models made by hand. */
static bool is_sound(const kent_model *m, const kent_pipe *pipe,
                     kent_complaints *complaints)
{
    if (pipe->route_count < 2) {
        kent_place_complain(m, pipe->place, complaints,
                            "pipe \"%s\": a route needs at least two points", pipe->id);
        return false;
    }
    if (!(pipe->inside_diameter > 0.0)) {
        kent_place_complain(m, pipe->place, complaints,
                            "pipe \"%s\" has no inside diameter; give "
                            "inside_diameter, or outside_diameter and wall_thickness",
                            pipe->id);
        return false;
    }
    if (!isnan(pipe->length) && !(pipe->length > 0.0)) {
        kent_place_complain(m, pipe->place, complaints,
                            "pipe \"%s\": length must be above zero", pipe->id);
        return false;
    }
    if (isnan(pipe->wave_speed) && !(pipe->wall > 0.0 && pipe->modulus > 0.0)) {
        kent_place_complain(m, pipe->place, complaints,
                            "pipe \"%s\": its wave speed is not known; give "
                            "wall_thickness and elastic_modulus, or wave_speed",
                            pipe->id);
        return false;
    }
    for (size_t k = 1; k < pipe->route_count; k++) {
        const size_t stop = pipe->route_first + k;
        if (m->route[stop] != m->route[stop - 1]) continue;
        kent_place_complain(m, pipe->place, complaints,
                            "pipe \"%s\": its route names \"%s\" twice in a row",
                            pipe->id, m->points[m->route[stop]].id);
        return false;
    }
    return true;
}

kent_status kent_route_measure(kent_model *m, const kent_layout *l,
                               kent_complaints *complaints)
{
    m->chainage = kent_alloc(m->route_count, sizeof *m->chainage);
    if (!m->chainage) return KENT_E_NOMEM;
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *pipe = &m->pipes[i];
        if (!is_sound(m, pipe, complaints)) continue;
        if (is_surveyed(m, pipe)) {
            measure_surveyed(m, l, pipe, complaints);
        } else {
            measure_without_plan(m, pipe, complaints);
        }
    }
    return KENT_OK;
}

static const kent_point *point_of(const kent_model *m, size_t stop)
{
    return &m->points[m->route[stop]];
}

int kent_route_follows(const kent_model *m, const kent_layout *l, const kent_pipe *pipe)
{
    const int start = m->route[pipe->route_first];
    bool ended = false;
    if (kent_layout_runs_through(m, l, l->owner[start])) return -1;
    for (size_t i = l->first[start]; i < l->first[start + 1]; i++) {
        const size_t stop = l->stop[i];
        if (stop >= pipe->route_first) break;
        const kent_pipe *before = &m->pipes[l->pipe[stop]];
        if (stop + 1 != before->route_first + before->route_count) return -1;
        ended = true;
    }
    return ended ? 1 : 0;
}

/* m: where a pipe starts. It goes on from the pipe before it that ends there; else a
 * station given at its first point, or further on, anchors it. */
static double start_station(const kent_model *m, const kent_layout *l,
                            const kent_pipe *pipe)
{
    const kent_point *start = point_of(m, pipe->route_first);
    const int how = kent_route_follows(m, l, pipe);
    if (how > 0 && !isnan(start->station_ahead)) return start->station_ahead;
    if (how >= 0 && !isnan(start->station)) return start->station;
    if (how > 0) return l->station[m->route[pipe->route_first]];
    for (size_t k = 1; k < pipe->route_count; k++) {
        const size_t stop = pipe->route_first + k;
        if (l->owner[m->route[stop]] != stop) continue;
        const double given = point_of(m, stop)->station;
        if (!isnan(given)) return given - m->chainage[stop];
    }
    return 0.0;
}

void kent_route_complain_falling(const kent_model *m, const kent_pipe *pipe,
                                 size_t stop, double before, double here,
                                 kent_complaints *complaints)
{
    const kent_point *point = point_of(m, stop);
    kent_place_complain(m, point->place, complaints,
                        "point \"%s\": its station is %s, that of \"%s\" before it on "
                        "pipe \"%s\" %s; stations rise along a route: correct them, "
                        "turn the route round, or give station_ahead where counting "
                        "starts anew",
                        point->id, kent_said_of(KENT_LENGTH, m->units, here).s,
                        point_of(m, stop - 1)->id, pipe->id,
                        kent_said_of(KENT_LENGTH, m->units, before).s);
}

/* Stations along one pipe; a given one counts on the pipe whose it is. */
static void count_stations(const kent_model *m, const kent_layout *l,
                           const kent_pipe *pipe, kent_complaints *complaints)
{
    double here = start_station(m, l, pipe);
    for (size_t k = 0; k < pipe->route_count; k++) {
        const size_t stop = pipe->route_first + k;
        const int point = m->route[stop];
        const bool own = l->owner[point] == stop;
        if (k > 0) {
            const double before = m->station_on[stop - 1];
            here = before + m->chainage[stop] - m->chainage[stop - 1];
            const double given = m->points[point].station;
            if (own && !isnan(given)) here = given;
            const bool drop =
                m->points[point].at.z != m->points[m->route[stop - 1]].at.z;
            if (here < before || (here == before && !drop)) {
                kent_route_complain_falling(m, pipe, stop, before, here, complaints);
            }
        }
        m->station[stop] = m->station_on[stop] = here;
        const double ahead = m->points[point].station_ahead;
        if (own && !isnan(ahead)) m->station_on[stop] = ahead;
        if (own) l->station[point] = here;
    }
}

kent_status kent_route_stations(kent_model *m, const kent_layout *l,
                                kent_complaints *complaints)
{
    m->station = kent_alloc(m->route_count, sizeof *m->station);
    m->station_on = kent_alloc(m->route_count, sizeof *m->station_on);
    if (!m->station || !m->station_on) return KENT_E_NOMEM;
    for (size_t p = 0; p < m->point_count; p++) {
        l->station[p] = (double)NAN;
    }
    for (size_t i = 0; i < m->pipe_count; i++) {
        count_stations(m, l, &m->pipes[i], complaints);
    }
    return KENT_OK;
}
