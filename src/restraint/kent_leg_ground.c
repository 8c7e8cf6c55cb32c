/* The ground along a leg, stretch by stretch, and where sound ground begins. */
#include "kent_leg_internal.h"

#include <math.h>

/* Relative: a length that falling cover makes longer than this no more is found. */
static const double NEAR_ENOUGH = 1e-9;

/* ---- edges of zones -------------------------------------------------------------- */

/* m: the chainage between two at which a station is reached. Stations rise along. */
static double chainage_of(const kent_model *m, int pipe, double station, double low,
                          double high)
{
    for (int i = 0; i < 60; i++) {
        const double middle = 0.5 * (low + high);
        if (kent_model_station_at(m, pipe, middle) < station) {
            low = middle;
        } else {
            high = middle;
        }
    }
    return high;
}

/* The next `from` or `to` of any zone of the pipe, whatever lies beyond it. */
static double any_edge(const kent_model *m, int pipe, double from, bool ahead)
{
    const double end = kent_pipe_laid(m, pipe);
    const double here = kent_model_station_at(m, pipe, from);
    double nearest = INFINITY; /* m, of stations */

    for (size_t i = m->zone_first[pipe]; i < m->zone_first[pipe + 1]; i++) {
        const kent_ground_zone *zone = &m->ground_zones[m->zone_order[i]];
        const double edges[] = {zone->from, zone->to};
        for (size_t k = 0; k < 2; k++) {
            const double away = ahead ? edges[k] - here : here - edges[k];
            if (away > KENT_SAME_PLACE) nearest = fmin(nearest, away);
        }
    }
    if (isinf(nearest)) return ahead ? INFINITY : -INFINITY;
    const double edge = ahead ? chainage_of(m, pipe, here + nearest, from, end)
                              : chainage_of(m, pipe, here - nearest, 0.0, from);
    const bool inside = ahead ? edge < end - KENT_SAME_PLACE : edge > KENT_SAME_PLACE;
    return inside ? edge : ahead ? INFINITY : -INFINITY;
}

double kent_zone_edge(const kent_model *m, int pipe, double from, bool ahead)
{
    const double step = ahead ? KENT_SAME_PLACE : -KENT_SAME_PLACE;
    const int zone = kent_model_ground_at(m, pipe, from + step).zone;
    double edge = from;

    do { /* a zone that lies within another one, listed earlier, has no edges */
        edge = any_edge(m, pipe, edge, ahead);
    } while (isfinite(edge) && kent_model_ground_at(m, pipe, edge + step).zone == zone);
    return edge;
}

/* ---- one part -------------------------------------------------------------------- */

/* A part of a leg in one kind of ground: to the next edge of a zone, to the end of a
 * pipe that another goes on from, or to the leg's end. */
typedef struct leg_part {
    kent_along way;
    double reach;            /* m, INFINITY: nothing changes */
    kent_along next;         /* the way beyond that */
    kent_ground_here ground; /* where nothing else is said */
} leg_part;

/* The ground at a distance (m) into the part, where nothing of its own is said. What
 * nobody states there is as where the part begins. */
static kent_ground_here part_ground(const kent_model *m, const leg_part *part,
                                    double away)
{
    kent_ground_here here =
        kent_model_ground_at(m, part->way.pipe, kent_along_place(part->way, away));
    if (here.soil < 0) here.soil = part->ground.soil;
    if (here.trench < 0) here.trench = part->ground.trench;
    if (isnan(here.cover)) here.cover = part->ground.cover;
    if (isnan(here.water_table)) here.water_table = part->ground.water_table;
    return here;
}

/* What a stop says of its own. Ground that can't be relied on is no part's: it breaks
 * the leg (kent_leg_fits). */
static void ground_of_stop(const kent_model *m, int point, double outside,
                           kent_ground_here *ground)
{
    const kent_point *p = &m->points[point];
    const double cover = kent_point_cover(p, outside);

    if (p->soil >= 0 && kent_soil_counts(&m->soils[p->soil])) ground->soil = p->soil;
    if (!isnan(cover)) ground->cover = cover;
    if (!isnan(p->water_table)) ground->water_table = p->water_table;
}

/* At a stop: what it says of its own, and the slope before and beyond it. */
static unsigned stop_weaken(const kent_model *m, const leg_part *part, size_t stop,
                            double away, kent_leg_work *w, kent_leg_piece *piece)
{
    const int point = m->route[stop];
    kent_leg_place place = {part_ground(m, part, away), part->way.pipe, piece->rise};

    ground_of_stop(m, point, m->pipes[part->way.pipe].outside_diameter, &place.ground);
    unsigned lack = kent_piece_weaken(m, &place, point, w, piece);
    for (int beyond = 0; beyond < 2 && lack == 0; beyond++) {
        place.rise = kent_along_rise(m, part->way, away, beyond != 0);
        lack = kent_piece_weaken(m, &place, piece->weakest, w, piece);
    }
    return lack;
}

/* Between two distances (m) into a part, its piece becomes as weak as its weakest stop,
 * and as the cover and slope at the second. Returns what is missing. */
static unsigned part_weaken(const kent_model *m, const leg_part *part, double begin,
                            double end, kent_leg_work *w, kent_leg_piece *piece)
{
    const kent_pipe *pipe = &m->pipes[part->way.pipe];
    const double start = m->chainage[pipe->route_first];
    const double a = kent_along_place(part->way, begin);
    const double b = kent_along_place(part->way, end);
    const size_t stops = pipe->route_first + pipe->route_count;
    const bool edge = part->next.pipe == part->way.pipe; /* else the pipe's end */
    const double last = part->reach + (edge ? -KENT_SAME_PLACE : KENT_SAME_PLACE);
    const kent_leg_place place = {part_ground(m, part, end - KENT_SAME_PLACE),
                                  part->way.pipe,
                                  kent_along_rise(m, part->way, end, false)};
    unsigned lack = kent_piece_weaken(m, &place, -1, w, piece);

    for (size_t k =
             kent_stop_search(m, pipe->route_first, pipe->route_count, fmin(a, b));
         k < stops && lack == 0; k++) {
        const double there = m->chainage[k] - start;
        const double away = fabs(there - part->way.at);
        if (there > fmax(a, b)) break;
        if (away <= KENT_SAME_PLACE || away >= last) continue;
        lack = stop_weaken(m, part, k, away, w, piece);
    }
    return lack;
}

/* m that a demand (N) takes of a piece. */
static double piece_need(const kent_leg_piece *piece, double left)
{
    if (left <= 0.0) return 0.0;
    return piece->resistance > 0.0 ? left / piece->resistance : INFINITY;
}

/* m: how much of a part is needed for what is left (N) of the demand, its piece being
 * no stronger than the weakest ground of that length, or of `room` m. Returns what is
 * missing. */
static unsigned part_need(const kent_model *m, const leg_part *part, double left,
                          double room, kent_leg_work *w, kent_leg_piece *piece,
                          double *needed)
{
    const double most = fmin(room, fmin(part->reach, kent_along_left(m, part->way)));
    double need = piece_need(piece, left);
    double looked = 0.0;

    while (looked < most && need > looked * (1.0 + NEAR_ENOUGH)) {
        const double to = fmin(need, most);
        const unsigned lack = part_weaken(m, part, looked, to, w, piece);
        if (lack != 0) return lack;
        need = piece_need(piece, left);
        looked = to;
    }
    *needed = need;
    return 0;
}

/* Whether a leg leaves the fitting in other ground than the fitting's: at an edge, or
 * where a fitting has a soil of its own within a zone. */
static bool leaves_other(const kent_model *m, const kent_fitting *fitting, int pipe,
                         const kent_ground_here *beyond)
{
    if (beyond->zone >= 0) {
        return beyond->zone != fitting->zone || beyond->soil != fitting->soil;
    }
    return fitting->zone >= 0 && m->ground_zones[fitting->zone].pipe == pipe;
}

/* The part that begins on a way. */
static leg_part part_from(const kent_model *m, kent_along way)
{
    const double step = way.ahead ? KENT_SAME_PLACE : -KENT_SAME_PLACE;
    const double edge = kent_zone_edge(m, way.pipe, way.at, way.ahead);
    leg_part part = {
        .way = way,
        .reach = fabs(edge - way.at),
        .next = {way.pipe, way.ahead, edge},
        .ground = kent_model_ground_at(m, way.pipe, way.at + step),
    };

    if (isinf(edge) && kent_along_on(m, way, &part.next)) {
        part.reach = kent_along_left(m, way);
    }
    return part;
}

/* The first part, in the ground of the fitting unless it leaves that at once. */
static leg_part part_first(const kent_model *m, const kent_fitting *fitting,
                           const kent_port *port, double *own)
{
    leg_part part = part_from(m, kent_along_of(m, port));

    *own = 0.0;
    if (leaves_other(m, fitting, part.way.pipe, &part.ground)) return part;
    *own = part.reach;
    part.ground.soil = fitting->soil;
    part.ground.backfill = fitting->backfill;
    part.ground.trench = fitting->trench;
    part.ground.cover = fitting->cover;
    part.ground.water_table = fitting->water_table;
    return part;
}

/* The part beyond. Where only the pipe changes, the ground goes on. */
static leg_part part_next(const kent_model *m, const leg_part *part, double *own,
                          double length)
{
    const bool fits = *own >= length - KENT_SAME_PLACE; /* still in the fitting's */
    const bool same = part->next.pipe == part->way.pipe;
    leg_part next = part_from(m, part->next);

    if (same || next.ground.zone >= 0 || part->ground.zone >= 0) return next;
    next.ground = part->ground;
    if (fits) *own = length + next.reach;
    return next;
}

/* Whether nothing holds the pipe where a leg begins, whatever the soil. */
static bool begins_free(const kent_model *m, const leg_part *part)
{
    return part->ground.casing || m->pipes[part->way.pipe].above_ground;
}

unsigned kent_leg_pieces(const kent_model *m, const kent_fitting *fitting,
                         const kent_port *port, kent_leg_work *w)
{
    double left = w->demand, length = 0.0;
    leg_part part = part_first(m, fitting, port, &w->own);

    w->sleeve = m->ground.wrapped ? m->rules.wrapped_ratio : 1.0;
    w->piece_count = 0;
    w->gives = 0.0;
    if (!begins_free(m, &part) &&
        (fitting->soil < 0 || !kent_soil_counts(&m->soils[fitting->soil]))) {
        return KENT_LACK_SOIL;
    }
    for (;;) {
        const double room = w->limit - length;
        const kent_leg_place place = {part.ground, part.way.pipe,
                                      kent_along_rise(m, part.way, 0.0, true)};
        double needed = NAN;
        if (w->piece_count == KENT_LEG_PIECES) return KENT_LACK_PIECES;
        kent_leg_piece *piece = &w->piece[w->piece_count];
        unsigned lack = kent_piece_fill(m, &place, w, piece);
        if (lack == 0) lack = part_need(m, &part, left, room, w, piece, &needed);
        if (lack != 0) return lack;
        w->piece_count++;
        const double most = fmin(part.reach, room);
        piece->length = fmin(needed, most);
        w->length = length + piece->length;
        w->gives += piece->resistance * piece->length;
        if (isinf(piece->length)) {
            return piece->counts ? KENT_LACK_GRIP : KENT_LACK_SOUND;
        }
        if (needed <= most || room <= part.reach) return 0;
        piece->counts = piece->resistance > 0.0;
        length = w->length;
        left -= piece->resistance * piece->length;
        part = part_next(m, &part, &w->own, length);
    }
}

/* ---- where sound ground begins --------------------------------------------------- */

/* At the nearest point beyond the port whose own soil, or the ground's, counts. */
static kent_sound sound_point(const kent_model *m, const kent_port *port)
{
    const kent_span *span = &m->spans[port->span];
    const kent_pipe *pipe = &m->pipes[span->pipe];
    const bool ahead = port->sign > 0.0;
    const double start = m->chainage[pipe->route_first];
    const double here = kent_along_of(m, port).at;
    const double length = kent_pipe_laid(m, span->pipe);
    kent_sound sound = {ahead ? length - here : here, NULL, -1};

    for (size_t k = 0; k < pipe->route_count; k++) {
        const size_t stop = pipe->route_first + (ahead ? k : pipe->route_count - 1 - k);
        const double there = m->chainage[stop] - start;
        const double away = ahead ? there - here : here - there;
        if (!(away > KENT_SAME_PLACE)) continue;
        const int own = m->points[m->route[stop]].soil;
        const int soil =
            own >= 0 ? own : kent_model_ground_at(m, span->pipe, there).soil;
        if (soil < 0 || !kent_soil_counts(&m->soils[soil])) continue;
        return (kent_sound){away, &m->soils[soil], m->route[stop]};
    }
    return sound;
}

kent_sound kent_leg_sound(const kent_model *m, const kent_port *port)
{
    const int pipe = m->spans[port->span].pipe;
    const bool ahead = port->sign > 0.0;
    const double here = kent_along_of(m, port).at;
    const double step = ahead ? KENT_SAME_PLACE : -KENT_SAME_PLACE;
    const kent_sound point = sound_point(m, port);

    for (double x = kent_zone_edge(m, pipe, here, ahead);
         isfinite(x) && fabs(x - here) < point.distance;
         x = kent_zone_edge(m, pipe, x, ahead)) {
        const int soil = kent_model_ground_at(m, pipe, x + step).soil;
        if (soil < 0 || !kent_soil_counts(&m->soils[soil])) continue;
        return (kent_sound){fabs(x - here), &m->soils[soil], -1};
    }
    return point;
}
