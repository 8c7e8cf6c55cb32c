/* What a metre of pipe holds in one kind of ground. */
#include "kent_leg_internal.h"
#include "kent_block_internal.h"

static const double PI = 3.14159265358979323846;

/* N per m of empty pipe; NAN: not known. source 11.1 */
double kent_leg_pipe_weight(const kent_pipe *p, double gravity)
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
static unsigned friction_lacks(const kent_soil *s)
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
    return lack;
}

static unsigned bearing_lacks(const kent_soil *s, int trench)
{
    unsigned lack = 0;

    if (isnan(s->unit_weight)) lack |= KENT_LACK_UNIT_WEIGHT;
    if (isnan(s->friction_angle)) lack |= KENT_LACK_FRICTION_ANGLE;
    if (isnan(s->cohesion)) lack |= KENT_LACK_COHESION;
    if (isnan(passive_ratio(s, trench))) lack |= KENT_LACK_PASSIVE_RATIO;
    return lack;
}

/* What friction and bearing need of the soils they are from. */
static unsigned piece_lacks(const kent_leg_piece *piece, kent_leg_work *w)
{
    const unsigned rubs = friction_lacks(piece->fill);
    const unsigned bears =
        w->bears ? bearing_lacks(piece->soil, piece->trench_kind) : 0;

    if (piece->fill == piece->soil) {
        if (rubs | bears) w->lacking = piece->soil;
        return rubs | bears;
    }
    if (rubs != 0) {
        w->lacking = piece->fill;
        return rubs;
    }
    if (bears != 0) w->lacking = piece->soil;
    return bears;
}

/* A value that does not matter may be missing: what it multiplies is nil. */
static double known(double value) { return isnan(value) ? 0.0 : value; }

static kent_trench trench_in(const kent_model *m, const kent_leg_place *place,
                             const kent_soil *s, const kent_leg_piece *piece)
{
    const kent_pipe *p = piece->pipe;
    const double od = p->outside_diameter, bore = p->inside_diameter;
    const bool wet = place->ground.water_table < place->ground.cover + od;
    const double water = wet ? m->rules.water_unit_weight : 0.0;

    return (kent_trench){
        .outside_diameter = od,
        .cover = place->ground.cover,
        .pipe_weight = piece->pipe_weight - water * 0.25 * PI * od * od,
        .water_weight = m->water.density * m->gravity * 0.25 * PI * bore * bore,
        .unit_weight = s->unit_weight - water,
        .friction_angle = s->friction_angle,
        .cohesion = s->cohesion,
        .friction_ratio = known(s->friction_ratio),
        .adhesion_ratio = known(s->adhesion_ratio),
        .passive_ratio = known(passive_ratio(s, place->ground.trench)),
        .slope = asin(place->rise),
    };
}

/* N/m of the trench side, by the form that the leg is worked out with. */
static double side_bearing(const kent_leg_work *w, const kent_trench *side)
{
    switch (w->form) {
    case KENT_FORM_HANDBOOK:
        break;
    case KENT_FORM_ETL:
        return kent_soil_bearing_etl(side);
    }
    return kent_soil_grip_of(side).bearing;
}

/* N/m that the pipe's own weight and its water's ask for on the way up. Ground water
 * takes nothing off it, so that wetter ground never shortens a length. source 11.23 */
static double slope_load(const kent_model *m, const kent_leg_place *place,
                         const kent_leg_work *w, const kent_leg_piece *piece)
{
    const double bore = piece->pipe->inside_diameter;
    const double water = m->water.density * m->gravity * 0.25 * PI * bore * bore;

    if (!(place->rise > 0.0)) return 0.0; /* downhill it would help: not counted */
    return w->factor * (piece->pipe_weight + water) * place->rise;
}

static void piece_grip(const kent_model *m, const kent_leg_place *place,
                       const kent_leg_work *w, kent_leg_piece *out)
{
    const double od = out->pipe->outside_diameter;
    const bool wet = place->ground.water_table < place->ground.cover + od;

    out->displaced = wet ? m->rules.water_unit_weight * 0.25 * PI * od * od : 0.0;
    out->trench = trench_in(m, place, out->fill, out);
    out->side = trench_in(m, place, out->soil, out);
    out->grip = kent_soil_grip_of(&out->trench);
    out->friction =
        w->sleeve * (w->bend ? out->grip.friction : out->grip.friction_whole);
    out->bearing = w->bears ? side_bearing(w, &out->side) : 0.0;
    /* a pipe that floats has no friction, and certainly none the other way */
    const double holds =
        w->side_alone ? out->bearing : out->friction + 0.5 * out->bearing;
    out->resistance = fmax(0.0, holds);
}

/* What keeps the ground of a piece from holding anything. */
static kent_free piece_free(const kent_leg_place *place, const kent_leg_piece *piece)
{
    if (place->ground.casing) return KENT_FREE_CASING;
    if (piece->pipe->above_ground) return KENT_FREE_ABOVE;
    if (piece->soil && !kent_soil_counts(piece->soil)) return KENT_FREE_SOIL;
    if (piece->fill && !kent_fill_counts(piece->fill)) return KENT_FREE_FILL;
    return KENT_FREE_NOT;
}

unsigned kent_piece_fill(const kent_model *m, const kent_leg_place *place,
                         kent_leg_work *w, kent_leg_piece *out)
{
    const kent_ground_here *ground = &place->ground;
    const kent_pipe *pipe = &m->pipes[place->pipe];
    const kent_soil *soil = ground->soil >= 0 ? &m->soils[ground->soil] : NULL;
    unsigned lack = 0;

    *out = (kent_leg_piece){
        .soil = soil,
        .fill = ground->backfill >= 0 ? &m->soils[ground->backfill] : soil,
        .pipe = pipe,
        .pipe_index = place->pipe,
        .pipe_weight = kent_leg_pipe_weight(pipe, m->gravity),
        .trench_kind = ground->trench,
        .weakest = -1,
        .rise = place->rise,
        .trench.cover = ground->cover,
    };
    out->free = piece_free(place, out);
    out->counts = out->free == KENT_FREE_NOT;
    out->slope_load = slope_load(m, place, w, out);
    if (isnan(out->slope_load)) return KENT_LACK_PIPE_MASS;
    if (out->counts) {
        if (!soil) return KENT_LACK_SOIL;
        lack = piece_lacks(out, w);
        if (isnan(ground->cover)) lack |= KENT_LACK_COVER;
        if (isnan(out->pipe_weight)) lack |= KENT_LACK_PIPE_MASS;
        if (lack != 0) return lack;
        piece_grip(m, place, w, out);
    }
    if (!w->side_alone) out->resistance -= out->slope_load;
    return 0;
}

unsigned kent_piece_weaken(const kent_model *m, const kent_leg_place *place, int point,
                           kent_leg_work *w, kent_leg_piece *piece)
{
    kent_leg_piece other = {0};
    const unsigned lack = kent_piece_fill(m, place, w, &other);

    if (lack != 0) return lack;
    if (other.resistance < piece->resistance) {
        *piece = other;
        piece->weakest = point;
    }
    return 0;
}
