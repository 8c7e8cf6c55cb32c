/* The ground along a leg, stretch by stretch, and where sound ground begins. */
#include "kent_leg_internal.h"
#include "kent_block_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

/* m: places nearer than this along a pipe are one place. */
static const double SAME_PLACE = 1e-6;

/* Relative: a length that falling cover makes longer than this no more is found. */
static const double NEAR_ENOUGH = 1e-9;

double kent_port_chainage(const kent_model *m, const kent_port *port)
{
    const kent_span *span = &m->spans[port->span];
    const size_t start = m->pipes[span->pipe].route_first;
    return m->chainage[span->route_first] - m->chainage[start] + port->chainage;
}

static double pipe_length(const kent_model *m, int pipe)
{
    const kent_pipe *p = &m->pipes[pipe];
    const size_t last = p->route_first + p->route_count - 1;
    return m->chainage[last] - m->chainage[p->route_first];
}

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
    const double end = pipe_length(m, pipe);
    const double here = kent_model_station_at(m, pipe, from);
    double nearest = INFINITY; /* m, of stations */

    for (size_t i = m->zone_first[pipe]; i < m->zone_first[pipe + 1]; i++) {
        const kent_ground_zone *zone = &m->ground_zones[m->zone_order[i]];
        const double edges[] = {zone->from, zone->to};
        for (size_t k = 0; k < 2; k++) {
            const double away = ahead ? edges[k] - here : here - edges[k];
            if (away > SAME_PLACE) nearest = fmin(nearest, away);
        }
    }
    if (isinf(nearest)) return ahead ? INFINITY : -INFINITY;
    const double edge = ahead ? chainage_of(m, pipe, here + nearest, from, end)
                              : chainage_of(m, pipe, here - nearest, 0.0, from);
    const bool inside = ahead ? edge < end - SAME_PLACE : edge > SAME_PLACE;
    return inside ? edge : ahead ? INFINITY : -INFINITY;
}

double kent_zone_edge(const kent_model *m, int pipe, double from, bool ahead)
{
    const double step = ahead ? SAME_PLACE : -SAME_PLACE;
    const int zone = kent_model_ground_at(m, pipe, from + step).zone;
    double edge = from;

    do { /* a zone that lies within another one, listed earlier, has no edges */
        edge = any_edge(m, pipe, edge, ahead);
    } while (isfinite(edge) && kent_model_ground_at(m, pipe, edge + step).zone == zone);
    return edge;
}

/* ---- one piece ------------------------------------------------------------------- */

/* N per m of empty pipe; NAN: not known. source 11.1 */
static double pipe_weight(const kent_pipe *p, double gravity)
{
    const double mean = p->outside_diameter - p->wall;
    if (!isnan(p->unit_mass)) return p->unit_mass * gravity;
    return PI * mean * p->wall * p->material_density * gravity;
}

/* The soil's for this kind of trench, else its own for any. */
static double passive_ratio(const kent_soil *s, int trench)
{
    const double own = trench >= 0 ? s->passive_by_trench[trench] : NAN;
    return isnan(own) ? s->passive_ratio : own;
}

/* A ratio matters unless what it multiplies is stated to be nil. */
static unsigned soil_lacks(const kent_soil *s, int trench, bool bears)
{
    unsigned lack = 0;

    if (isnan(s->unit_weight)) lack |= KENT_LACK_UNIT_WEIGHT;
    if (isnan(s->friction_angle)) lack |= KENT_LACK_FRICTION_ANGLE;
    if (isnan(s->cohesion)) lack |= KENT_LACK_COHESION;
    if (isnan(s->friction_ratio) && !(s->friction_angle <= 0.0)) {
        lack |= KENT_LACK_FRICTION_RATIO;
    }
    if (isnan(s->adhesion_ratio) && !(s->cohesion <= 0.0)) {
        lack |= KENT_LACK_ADHESION_RATIO;
    }
    if (isnan(passive_ratio(s, trench)) && bears) lack |= KENT_LACK_PASSIVE_RATIO;
    return lack;
}

/* A value that does not matter may be missing: what it multiplies is nil. */
static double known(double value) { return isnan(value) ? 0.0 : value; }

static void piece_grip(const kent_model *m, const kent_ground_here *ground,
                       const kent_leg_work *w, kent_leg_piece *out)
{
    const kent_pipe *p = w->pipe;
    const kent_soil *s = out->soil;
    const double od = p->outside_diameter, bore = p->inside_diameter;
    const bool wet = ground->water_table < ground->cover + od;
    const double water = wet ? m->rules.water_unit_weight : 0.0;

    out->displaced = water * 0.25 * PI * od * od;
    out->trench = (kent_trench){
        .outside_diameter = od,
        .cover = ground->cover,
        .pipe_weight = w->pipe_weight - out->displaced,
        .water_weight = m->water.density * m->gravity * 0.25 * PI * bore * bore,
        .unit_weight = s->unit_weight - water,
        .friction_angle = s->friction_angle,
        .cohesion = s->cohesion,
        .friction_ratio = known(s->friction_ratio),
        .adhesion_ratio = known(s->adhesion_ratio),
        .passive_ratio = known(passive_ratio(s, ground->trench)),
    };
    out->grip = kent_soil_grip_of(&out->trench);
    out->friction =
        w->sleeve * (w->bend ? out->grip.friction : out->grip.friction_whole);
    out->bearing = w->bears ? out->grip.bearing : 0.0;
    /* a pipe that floats has no friction, and certainly none the other way */
    out->resistance = fmax(0.0, out->friction + 0.5 * out->bearing);
}

/* A piece in this ground, without its length. Returns what is missing. */
static unsigned piece_fill(const kent_model *m, const kent_ground_here *ground,
                           kent_leg_work *w, kent_leg_piece *out)
{
    unsigned lack = 0;

    if (ground->soil < 0) return KENT_LACK_SOIL;
    *out = (kent_leg_piece){
        .soil = &m->soils[ground->soil],
        .trench_kind = ground->trench,
        .weakest = -1,
        .trench.cover = ground->cover,
    };
    out->counts = kent_soil_counts(out->soil);
    if (!out->counts) return 0;
    lack = soil_lacks(out->soil, ground->trench, w->bears);
    if (lack != 0) w->lacking = out->soil;
    if (isnan(ground->cover)) lack |= KENT_LACK_COVER;
    if (isnan(w->pipe_weight)) lack |= KENT_LACK_PIPE_MASS;
    if (lack == 0) piece_grip(m, ground, w, out);
    return lack;
}

/* Ground that holds less takes the piece's place. Returns what is missing. */
static unsigned piece_weaken(const kent_model *m, const kent_ground_here *ground,
                             int point, kent_leg_work *w, kent_leg_piece *piece)
{
    kent_leg_piece other = {0};
    const unsigned lack = piece_fill(m, ground, w, &other);

    if (lack != 0) return lack;
    if (other.resistance < piece->resistance) {
        *piece = other;
        piece->weakest = point;
    }
    return 0;
}

/* ---- one part -------------------------------------------------------------------- */

/* A part of a leg in one kind of ground: to the next edge of a zone, or to the end. */
typedef struct leg_part {
    int pipe;
    bool ahead;
    double from, reach;      /* m: chainage of the pipe; to the edge, INFINITY: none */
    kent_ground_here ground; /* where nothing else is said */
} leg_part;

static double part_place(const leg_part *part, double away)
{
    return part->ahead ? part->from + away : part->from - away;
}

/* The ground at a distance (m) into the part, where nothing of its own is said. What
 * nobody states there is as where the part begins. */
static kent_ground_here part_ground(const kent_model *m, const leg_part *part,
                                    double away)
{
    kent_ground_here here = kent_model_ground_at(m, part->pipe, part_place(part, away));
    if (here.soil < 0) here.soil = part->ground.soil;
    if (here.trench < 0) here.trench = part->ground.trench;
    if (isnan(here.cover)) here.cover = part->ground.cover;
    if (isnan(here.water_table)) here.water_table = part->ground.water_table;
    return here;
}

size_t kent_stop_search(const kent_model *m, size_t first, size_t count,
                        double chainage)
{
    size_t lo = first, hi = first + count;

    while (lo < hi) {
        const size_t mid = lo + (hi - lo) / 2;
        if (m->chainage[mid] - m->chainage[first] < chainage) {
            lo = mid + 1;
        } else {
            hi = mid;
        }
    }
    return lo;
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

/* Between two distances (m) into a part, its piece becomes as weak as its weakest stop,
 * and as the cover at the second. Returns what is missing. */
static unsigned part_weaken(const kent_model *m, const leg_part *part, double begin,
                            double end, kent_leg_work *w, kent_leg_piece *piece)
{
    const kent_pipe *pipe = &m->pipes[part->pipe];
    const double start = m->chainage[pipe->route_first];
    const double a = part_place(part, begin), b = part_place(part, end);
    const size_t stops = pipe->route_first + pipe->route_count;
    kent_ground_here ground = part_ground(m, part, end - SAME_PLACE);
    unsigned lack = piece_weaken(m, &ground, -1, w, piece);

    for (size_t k =
             kent_stop_search(m, pipe->route_first, pipe->route_count, fmin(a, b));
         k < stops && lack == 0; k++) {
        const double there = m->chainage[k] - start;
        const double away = fabs(there - part->from);
        if (there > fmax(a, b)) break;
        if (away <= SAME_PLACE || away >= part->reach - SAME_PLACE) continue;
        ground = part_ground(m, part, away);
        ground_of_stop(m, m->route[k], pipe->outside_diameter, &ground);
        lack = piece_weaken(m, &ground, m->route[k], w, piece);
    }
    return lack;
}

/* m: how much of a part is needed for what is left (N) of the demand, its piece being
 * no stronger than the weakest ground of that length. Returns what is missing. */
static unsigned part_need(const kent_model *m, const leg_part *part, double left,
                          kent_leg_work *w, kent_leg_piece *piece, double *needed)
{
    const double length = pipe_length(m, part->pipe);
    const double whole = part->ahead ? length - part->from : part->from;
    const double most = fmin(part->reach, whole);
    double need = left / piece->resistance; /* not finite: nothing holds */
    double looked = 0.0;

    while (looked < most && need > looked * (1.0 + NEAR_ENOUGH)) {
        const double to = fmin(need, most);
        const unsigned lack = part_weaken(m, part, looked, to, w, piece);
        if (lack != 0) return lack;
        need = left / piece->resistance;
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

/* The part that begins at a chainage. */
static leg_part part_from(const kent_model *m, int pipe, bool ahead, double from)
{
    const double step = ahead ? SAME_PLACE : -SAME_PLACE;
    const double edge = kent_zone_edge(m, pipe, from, ahead);

    return (leg_part){
        .pipe = pipe,
        .ahead = ahead,
        .from = from,
        .reach = fabs(edge - from),
        .ground = kent_model_ground_at(m, pipe, from + step),
    };
}

unsigned kent_leg_pieces(const kent_model *m, const kent_fitting *fitting,
                         const kent_port *port, kent_leg_work *w)
{
    double left = w->demand, length = 0.0;
    leg_part part = part_from(m, m->spans[port->span].pipe, port->sign > 0.0,
                              kent_port_chainage(m, port));

    w->pipe_weight = pipe_weight(w->pipe, m->gravity);
    w->sleeve = m->ground.wrapped ? m->rules.wrapped_ratio : 1.0;
    if (fitting->soil < 0 || !kent_soil_counts(&m->soils[fitting->soil])) {
        return KENT_LACK_SOIL;
    }
    w->own = part.reach;
    if (leaves_other(m, fitting, part.pipe, &part.ground)) {
        w->own = 0.0;
    } else {
        part.ground.soil = fitting->soil;
        part.ground.trench = fitting->trench;
        part.ground.cover = fitting->cover;
        part.ground.water_table = fitting->water_table;
    }
    for (;;) {
        double needed = NAN;
        if (w->piece_count == KENT_LEG_PIECES) return KENT_LACK_PIECES;
        kent_leg_piece *piece = &w->piece[w->piece_count];
        unsigned lack = piece_fill(m, &part.ground, w, piece);
        if (lack == 0) lack = part_need(m, &part, left, w, piece, &needed);
        if (lack != 0) return lack;
        w->piece_count++;
        if (isinf(part.reach) || needed <= part.reach) {
            piece->length = needed;
            w->length = length + needed;
            if (isfinite(needed)) return 0;
            return piece->counts ? KENT_LACK_GRIP : KENT_LACK_SOUND;
        }
        piece->counts = piece->resistance > 0.0;
        piece->length = part.reach;
        length += part.reach;
        left -= piece->resistance * part.reach;
        part = part_from(m, part.pipe, part.ahead, part_place(&part, part.reach));
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
    const double here = kent_port_chainage(m, port);
    const double length = pipe_length(m, span->pipe);
    kent_sound sound = {ahead ? length - here : here, NULL, -1};

    for (size_t k = 0; k < pipe->route_count; k++) {
        const size_t stop = pipe->route_first + (ahead ? k : pipe->route_count - 1 - k);
        const double there = m->chainage[stop] - start;
        const double away = ahead ? there - here : here - there;
        if (!(away > SAME_PLACE)) continue;
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
    const double here = kent_port_chainage(m, port);
    const double step = ahead ? SAME_PLACE : -SAME_PLACE;
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
