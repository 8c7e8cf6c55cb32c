/* The ground along a leg, stretch by stretch, and where sound ground begins. */
#include "kent_leg_internal.h"
#include "kent_block_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

/* m: places nearer than this along a pipe are one place. */
static const double SAME_PLACE = 1e-6;

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
    out->resistance = out->friction + 0.5 * out->bearing;
}

/* One more piece in this ground, without its length. Returns what is missing. */
static unsigned piece_add(const kent_model *m, const kent_ground_here *ground,
                          kent_leg_work *w)
{
    unsigned lack = 0;

    if (w->piece_count == KENT_LEG_PIECES) return KENT_LACK_PIECES;
    if (ground->soil < 0) return KENT_LACK_SOIL;
    kent_leg_piece *piece = &w->piece[w->piece_count];
    *piece = (kent_leg_piece){
        .soil = &m->soils[ground->soil],
        .trench_kind = ground->trench,
        .trench.cover = ground->cover,
    };
    piece->counts = kent_soil_counts(piece->soil);
    if (piece->counts) {
        lack = soil_lacks(piece->soil, ground->trench, w->bears);
        if (lack != 0) w->lacking = piece->soil;
        if (isnan(ground->cover)) lack |= KENT_LACK_COVER;
        if (isnan(w->pipe_weight)) lack |= KENT_LACK_PIPE_MASS;
        if (lack != 0) return lack;
        piece_grip(m, ground, w, piece);
    }
    w->piece_count++;
    return 0;
}

/* The ground of a zone from one chainage of a pipe to the next edge (INFINITY: none),
 * under the lesser of the covers at its ends. */
static kent_ground_here ground_between(const kent_model *m, int pipe, double from,
                                       double to)
{
    const double step = to > from ? SAME_PLACE : -SAME_PLACE;
    kent_ground_here ground = kent_model_ground_at(m, pipe, from + step);

    if (isfinite(to)) {
        const double there = kent_model_ground_at(m, pipe, to - step).cover;
        if (!(ground.cover <= there)) ground.cover = there; /* NaN: not known */
    }
    return ground;
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

unsigned kent_leg_pieces(const kent_model *m, const kent_fitting *fitting,
                         const kent_port *port, kent_leg_work *w)
{
    const int pipe = m->spans[port->span].pipe;
    const bool ahead = port->sign > 0.0;
    double from = kent_port_chainage(m, port), left = w->demand, length = 0.0;
    double edge = kent_zone_edge(m, pipe, from, ahead);
    kent_ground_here ground = ground_between(m, pipe, from, edge);

    w->pipe_weight = pipe_weight(w->pipe, m->gravity);
    w->sleeve = m->ground.wrapped ? m->rules.wrapped_ratio : 1.0;
    if (fitting->soil < 0 || !kent_soil_counts(&m->soils[fitting->soil])) {
        return KENT_LACK_SOIL;
    }
    w->own = fabs(edge - from);
    if (leaves_other(m, fitting, pipe, &ground)) {
        w->own = 0.0;
    } else {
        ground.soil = fitting->soil;
        ground.trench = fitting->trench;
        ground.cover = fitting->cover;
        ground.water_table = fitting->water_table;
    }
    for (;;) {
        const unsigned lack = piece_add(m, &ground, w);
        if (lack != 0) return lack;
        kent_leg_piece *piece = &w->piece[w->piece_count - 1];
        const double reach = fabs(edge - from);
        const double needed = left / piece->resistance; /* not finite: nothing holds */
        if (isinf(edge) || needed <= reach) {
            piece->length = needed;
            w->length = length + needed;
            if (isfinite(needed)) return 0;
            return piece->counts ? KENT_LACK_GRIP : KENT_LACK_SOUND;
        }
        piece->length = reach;
        length += reach;
        left -= piece->resistance * reach;
        from = edge;
        edge = kent_zone_edge(m, pipe, from, ahead);
        ground = ground_between(m, pipe, from, edge);
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
