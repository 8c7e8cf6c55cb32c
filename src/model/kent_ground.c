#include "kent_model_internal.h"

#include "kent_said.h"

#include <math.h>
#include <stdlib.h>

/* A zone may reach past its pipe by this, as stations are rounded: 0.05 m. */
static const double STATION_ROUNDING = 0.05;

/* Equation 5.8. */
double kent_point_cover(const kent_point *point, double outside_diameter)
{
    if (isnan(point->ground_level)) return point->cover;
    return point->ground_level - point->at.z - 0.5 * outside_diameter;
}

/* m; the bore where no outside diameter is known. */
static double outside_of(const kent_pipe *pipe)
{
    return isfinite(pipe->outside_diameter) ? pipe->outside_diameter
                                            : pipe->inside_diameter;
}

/* ---- stations and places --------------------------------------------------------- */

/* The stop that ends the leg in which a chainage of a pipe lies. */
static size_t leg_end(const kent_model *m, const kent_pipe *pipe, double chainage)
{
    size_t lo = pipe->route_first + 1, hi = pipe->route_first + pipe->route_count - 1;
    while (lo < hi) {
        const size_t mid = lo + (hi - lo) / 2;
        if (m->chainage[mid] <= chainage) {
            lo = mid + 1;
        } else {
            hi = mid;
        }
    }
    return lo;
}

/* 0 .. 1: how far along the leg that ends at a stop. */
static double share_of_leg(const kent_model *m, size_t end, double chainage)
{
    const double from = m->chainage[end - 1], to = m->chainage[end];
    return fmin(fmax((chainage - from) / (to - from), 0.0), 1.0);
}

double kent_model_station_at(const kent_model *m, int pipe, double chainage)
{
    const kent_pipe *p = &m->pipes[pipe];
    const size_t end = leg_end(m, p, chainage);
    const double from = m->station_on[end - 1], to = m->station[end];
    return from + share_of_leg(m, end, chainage) * (to - from);
}

/* ---- zones ----------------------------------------------------------------------- */

int kent_zone_at(const kent_model *m, int pipe, double station)
{
    const kent_pipe *p = &m->pipes[pipe];
    const double first = m->station_on[p->route_first] + STATION_ROUNDING;
    const double last = m->station[p->route_first + p->route_count - 1];
    for (size_t i = m->zone_first[pipe]; i < m->zone_first[pipe + 1]; i++) {
        const kent_ground_zone *zone = &m->ground_zones[m->zone_order[i]];
        const bool begun = station >= zone->from || zone->from <= first;
        const bool ended = station >= zone->to && zone->to < last - STATION_ROUNDING;
        if (begun && !ended) return m->zone_order[i];
    }
    return -1;
}

/* Zones by pipe, those of one pipe in the order listed. */
static kent_status sort_zones(kent_model *m)
{
    m->zone_first = kent_alloc(m->pipe_count + 2, sizeof *m->zone_first);
    m->zone_order = kent_alloc(m->ground_zone_count, sizeof *m->zone_order);
    if (!m->zone_first || !m->zone_order) return KENT_E_NOMEM;
    for (size_t i = 0; i < m->ground_zone_count; i++) {
        m->zone_first[m->ground_zones[i].pipe + 2]++;
    }
    for (size_t p = 2; p < m->pipe_count + 2; p++) {
        m->zone_first[p] += m->zone_first[p - 1];
    }
    for (size_t i = 0; i < m->ground_zone_count; i++) {
        m->zone_order[m->zone_first[m->ground_zones[i].pipe + 1]++] = (int)i;
    }
    return KENT_OK;
}

static void check_zone(const kent_model *m, const kent_ground_zone *zone,
                       kent_complaints *complaints)
{
    const kent_pipe *pipe = &m->pipes[zone->pipe];
    const double first = m->station_on[pipe->route_first];
    double least = first, most = first; /* station equations may lead back */
    for (size_t k = 0; k < pipe->route_count; k++) {
        const size_t stop = pipe->route_first + k;
        if (k > 0) most = fmax(most, m->station[stop]);
        if (k + 1 < pipe->route_count) least = fmin(least, m->station_on[stop]);
    }
    if (zone->from >= least - STATION_ROUNDING && zone->to <= most + STATION_ROUNDING) {
        return;
    }
    kent_place_complain(
        m, zone->place, complaints,
        "ground_zone on \"%s\": it reaches from %s to %s, the pipe from "
        "%s to %s; keep the zone within its pipe, and give the pipe "
        "beyond a zone of its own",
        pipe->id, kent_said_station(m->units, zone->from).s,
        kent_said_station(m->units, zone->to).s, kent_said_station(m->units, least).s,
        kent_said_station(m->units, most).s);
}

/* ---- levels of the ground -------------------------------------------------------- */

static void check_level(const kent_model *m, const kent_layout *l, int point,
                        kent_complaints *complaints)
{
    const kent_point *p = &m->points[point];
    double outside = 0.0;
    for (size_t i = l->first[point]; i < l->first[point + 1]; i++) {
        outside = fmax(outside, outside_of(&m->pipes[l->pipe[l->stop[i]]]));
    }
    const double cover = kent_point_cover(p, outside);
    if (!(cover < 0.0)) return; /* NAN: not known */
    kent_place_complain(m, p->place, complaints,
                        "point \"%s\": ground_level is %s below the crown of the pipe; "
                        "z is the level of the pipe's centre line: correct one of them",
                        p->id, kent_said_of(KENT_LENGTH, m->units, -cover).s);
}

kent_status kent_ground_settle(kent_model *m, const kent_layout *l,
                               kent_complaints *complaints)
{
    if (sort_zones(m) != KENT_OK) return KENT_E_NOMEM;
    for (size_t i = 0; i < m->ground_zone_count; i++) {
        check_zone(m, &m->ground_zones[i], complaints);
    }
    for (size_t p = 0; p < m->point_count; p++) {
        if (l->first[p] < l->first[p + 1]) check_level(m, l, (int)p, complaints);
    }
    return KENT_OK;
}

kent_ground_here kent_model_ground_at(const kent_model *m, int pipe, double chainage)
{
    const kent_pipe *p = &m->pipes[pipe];
    const kent_ground *ground = &m->ground;
    const size_t end = leg_end(m, p, chainage);
    const double outside = outside_of(p);
    const double from = kent_point_cover(&m->points[m->route[end - 1]], outside);
    const double to = kent_point_cover(&m->points[m->route[end]], outside);
    const double between = from + share_of_leg(m, end, chainage) * (to - from);
    kent_ground_here here = {
        .soil = ground->soil,
        .trench = ground->trench,
        .backfill = ground->backfill,
        .zone = kent_zone_at(m, pipe, kent_model_station_at(m, pipe, chainage)),
        .cover = ground->cover,
        .water_table = ground->water_table};

    if (here.zone >= 0) {
        const kent_ground_zone *zone = &m->ground_zones[here.zone];
        if (zone->soil >= 0) here.soil = zone->soil;
        if (zone->trench >= 0) here.trench = zone->trench;
        if (zone->backfill >= 0) here.backfill = zone->backfill;
        here.casing = zone->casing;
        if (!isnan(zone->cover)) here.cover = zone->cover;
        if (!isnan(zone->water_table)) here.water_table = zone->water_table;
    }
    if (!isnan(between)) here.cover = between;
    return here;
}
