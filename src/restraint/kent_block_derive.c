/* The block's part of a hand calculation: depths, areas, sides, what is reached. */
#include "kent_concrete_internal.h"
#include "kent_side_internal.h"
#include "kent_wedge.h"

#define UP(x) "ceil((" x ")/step - " KENT_SIDE_SLACK_TEXT ")*step"

static void rule(kent_derivation *d, const char *symbol, double value, kent_kind kind,
                 const char *says)
{
    kent_derivation_put(d, symbol, value, kind, KENT_CATALOGUE, says);
}

/* Utilisation, the factor reached, and both beside what the soil value holds. */
static void derive_reached(const kent_holding_work *w, kent_holding *h,
                           kent_sense sense, const char *formula)
{
    kent_derivation *d = &h->derivation;
    const kent_load_case *c = &w->loads->cases[h->by_sense[sense]];
    const double asked = c->safety_factor;
    const double use = w->use[sense];

    kent_derivation_put(d, "SF", asked, KENT_RATIO, kent_factor_source(w->m, c),
                        "factor asked for, of this load case");
    kent_derivation_work(d, "u", use, KENT_RATIO, formula, "10.9",
                         "factored load over resistance");
    kent_derivation_work(d, "SFr", asked / use, KENT_RATIO, "SF/u", "10.10",
                         "factor reached");
    if (sense == KENT_UPWARD) return; /* weight has no factor inside */
    const double inside = w->site.leans->factor_inside;
    kent_derivation_put(d, "fi", inside, KENT_RATIO, kent_soil_source(w->site.leans),
                        inside > 1.0 ? "factor already inside the soil's value"
                                     : "no factor is inside the soil's value");
    if (inside <= 1.0) return;
    kent_derivation_work(d, "SFa", asked * inside, KENT_RATIO, "SF*fi", "10.10",
                         "factor asked for, with the one inside");
    kent_derivation_work(d, "SFt", asked / use * inside, KENT_RATIO, "SFr*fi", "10.10",
                         "factor reached, with the one inside");
}

/* A pipe class has its diameter from the catalogue. */
static kent_source diameter_source(const kent_holding_work *w)
{
    const kent_port *port = &w->m->ports[w->fitting->port_first];

    if (port->span < 0) return KENT_GIVEN;
    const kent_pipe *pipe = &w->m->pipes[w->m->spans[port->span].pipe];
    return pipe->pipe_class[0] ? KENT_CATALOGUE : KENT_GIVEN;
}

/* Cover to axis to the greatest height of a face. */
static void derive_depth(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;
    const double axis = kent_site_axis(&w->site);

    kent_derivation_put(d, "OD", w->site.diameter, KENT_DIAMETER, diameter_source(w),
                        "outside diameter of the pipe");
    rule(d, "step", r->side_step, KENT_LENGTH, "sides come in multiples of this");
    if (isnan(axis)) return;
    kent_derivation_put(d, "cover", w->site.cover, KENT_LENGTH, KENT_GIVEN,
                        "ground to crown");
    kent_derivation_work(d, "axis", axis, KENT_LENGTH, "cover + OD/2", "10.1",
                         "depth of the pipe's axis");
}

static void derive_sides(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;
    const kent_face *face = &h->block.face;
    const bool hole = w->site.hole > 0.0;
    const double axis = kent_site_axis(&w->site);

    rule(d, "hd", r->height_to_depth, KENT_RATIO, "height over depth of base, at most");
    kent_derivation_work(d, "hmax", kent_face_height_limit(r, axis), KENT_LENGTH,
                         "hd*axis/(1 - hd/2)", "10.3", "greatest height of the face");
    if (r->height_over_diameter > 0.0) {
        rule(d, "ho", r->height_over_diameter, KENT_LENGTH,
             "height over the pipe's diameter, at least");
        kent_derivation_work(d, "hleast", w->site.diameter + r->height_over_diameter,
                             KENT_LENGTH, "OD + ho", "21.12",
                             "least height for this pipe");
    }
    rule(d, "rw", r->width_to_height[0], KENT_RATIO, "width over height, at least");
    rule(d, "rx", r->width_to_height[1], KENT_RATIO, "width over height, at most");
    kent_derivation_put(d, "h", face->height, KENT_LENGTH, KENT_COMPUTED,
                        "height, of those up to the greatest the one with least w x h");
    kent_derivation_work(d, "w", face->width, KENT_LENGTH,
                         hole ? "max(" UP("Ag/h") ", " UP("rw*h") ")"
                              : "max(" UP("Aq/h") ", " UP("rw*h") ")",
                         "10.6", "width");
    kent_derivation_work(d, "wmax", r->width_to_height[1] * face->height, KENT_LENGTH,
                         "rx*h", "10.6", "width, at most");
    kent_derivation_work(d, "base", axis + 0.5 * face->height, KENT_LENGTH,
                         "axis + h/2", "10.2", "depth of the face's base");
    const double spread = kent_site_thickness(r, &w->site, *face, KENT_SIDEWAYS);
    const double t = w->site.all_round ? fmax(spread, face->width) : spread;
    kent_concrete_derive_thickness(
        w, d, *face, spread, "max(w, h)",
        "thickness: spread from pipe to face within 45 degrees");
    if (w->site.all_round) {
        kent_derivation_work(d, "t", t, KENT_LENGTH, "max(t, w)", "9.19",
                             "and as wide on its other sides");
    }
    kent_derivation_work(d, "V", face->width * face->height * t, KENT_VOLUME, "w*h*t",
                         "10.8", "concrete");
}

/* How far the face leans on the ground, where something else stands near. */
static void derive_wedge(const kent_holding_work *w, kent_derivation *d)
{
    const double phi = w->soil->friction_angle;

    if (w->fitting->obstacle_count == 0) return;
    if (isnan(phi)) {
        kent_derivation_put(d, "phi", KENT_WEDGE_ANGLE, KENT_ANGLE, KENT_ASSUMED,
                            "friction angle of the soil, not given");
    } else {
        kent_derivation_put(d, "phi", phi, KENT_ANGLE, kent_soil_source(w->soil),
                            "friction angle of the soil");
    }
    kent_derivation_work(d, "R", w->reach, KENT_LENGTH, "base*tan(45 + phi/2)", "10.25",
                         "wedge of ground before the face, at the surface");
}

static void derive_face(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const double load = w->demand.load[KENT_SIDEWAYS], q = w->site.allowable;
    const bool hole = w->site.hole > 0.0;

    kent_derivation_heading(d, "Face for the sideways thrust");
    derive_depth(w, h);
    kent_bearing_derive(w, h, d);
    kent_derivation_work(d, "Aq", load / q, KENT_AREA, "Fh/q", "10.4",
                         "bearing area asked for");
    if (hole) {
        kent_derivation_work(d, "Ah", w->site.hole, KENT_AREA, "pi*OD^2/4", "10.5",
                             "of the face taken by the pipe that passes through");
        kent_derivation_work(d, "Ag", load / q + w->site.hole, KENT_AREA, "Aq + Ah",
                             "10.5", "area within the sides");
    }
    derive_sides(w, h);
    kent_derivation_work(d, "qr", w->use[KENT_SIDEWAYS] * q, KENT_STRESS,
                         hole ? "Fh/(w*h - Ah)" : "Fh/(w*h)", "10.9",
                         "bearing pressure reached");
    derive_wedge(w, d);
    derive_reached(w, h, KENT_SIDEWAYS, "qr/q");
}

/* Weight of a cubic metre of the block: gc, or gb where it stands in water (true). */
static bool derive_concrete(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;

    rule(d, "gc", r->concrete_unit_weight, KENT_UNIT_WEIGHT, "unit weight of concrete");
    if (!h->block.submerged) return false;
    rule(d, "gw", r->water_unit_weight, KENT_UNIT_WEIGHT,
         "unit weight of ground water");
    kent_derivation_work(d, "gb", r->concrete_unit_weight - r->water_unit_weight,
                         KENT_UNIT_WEIGHT, "gc - gw", "10.12",
                         "unit weight under water");
    return true;
}

/* What little lifts or presses a bearing block, on its own weight and footing. */
static void derive_bearing_upright(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_block *b = &h->block;
    const bool hole = w->site.hole > 0.0;

    if (w->demand.load[KENT_UPWARD] > 0.0) {
        kent_derivation_heading(d, "Weight of the same block for the upward thrust");
        const bool wet = derive_concrete(w, h);
        const double concrete = b->volume - w->site.hole * b->thickness;
        kent_derivation_work(d, "Vc", concrete, KENT_VOLUME, hole ? "V - Ah*t" : "V",
                             "10.13", "concrete that weighs on the pipe");
        derive_reached(w, h, KENT_UPWARD, wet ? "Fup/(Vc*gb)" : "Fup/(Vc*gc)");
    }
    if (w->demand.load[KENT_DOWNWARD] > 0.0) {
        kent_derivation_heading(d, "Footing of the same block for the downward thrust");
        kent_derivation_put(d, "qv", w->site.vertical, KENT_STRESS,
                            kent_soil_source(w->soil), "bearing under a base");
        derive_reached(w, h, KENT_DOWNWARD, "Fdn/(w*t*qv)");
    }
}

/* [no taller than the ground lets it be][carries a downward thrust too] */
static const char *const GRAVITY_SIDE[2][2] = {
    {UP("V0^(1/3)"), UP("max(V0^(1/3), sqrt(A0))")},
    {UP("sqrt(V0/top)"), UP("max(sqrt(V0/top), sqrt(A0))")},
};

static void derive_gravity(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;
    const kent_block *b = &h->block;
    const double up = w->demand.load[KENT_UPWARD];
    const double down = w->demand.load[KENT_DOWNWARD];

    const bool lifts = up > 0.0;

    kent_derivation_heading(d, lifts ? "Weight for the upward thrust"
                                     : "Footing for the downward thrust");
    derive_depth(w, h);
    const bool wet = lifts && derive_concrete(w, h);
    const double unit_weight =
        r->concrete_unit_weight - (wet ? r->water_unit_weight : 0.0);
    const double volume = kent_gravity_volume(up, 1.0, unit_weight);
    if (lifts) {
        kent_derivation_work(d, "V0", volume, KENT_VOLUME, wet ? "Fup/gb" : "Fup/gc",
                             "10.13", "concrete that weighs as much");
    }
    if (down > 0.0) {
        kent_derivation_put(d, "qv", w->site.vertical, KENT_STRESS,
                            kent_soil_source(w->soil), "bearing under a base");
        kent_derivation_work(d, "A0", down / w->site.vertical, KENT_AREA, "Fdn/qv",
                             "10.16", "area that carries the downward thrust");
    }
    const bool shallow = kent_gravity_shallow(r, &w->site, volume) > cbrt(volume);
    if (shallow) {
        kent_derivation_work(d, "top", kent_gravity_most(r, &w->site), KENT_LENGTH,
                             "-ceil(-(2*axis)/step - " KENT_SIDE_SLACK_TEXT ")*step",
                             "10.15", "height at which it would reach the ground");
    }
    kent_derivation_work(d, "a", b->width, KENT_LENGTH,
                         lifts ? GRAVITY_SIDE[shallow][down > 0.0] : UP("sqrt(A0)"),
                         "10.14", "side of a square plan");
    rule(d, "hmin", r->least_height, KENT_LENGTH, "least height");
    kent_derivation_work(d, "hg", b->height, KENT_LENGTH,
                         lifts ? UP("max(V0/(a*a), hmin)") : UP("hmin"), "10.15",
                         "height");
    if (!isnan(kent_site_axis(&w->site))) {
        kent_derivation_work(d, "base", kent_site_axis(&w->site) + 0.5 * b->height,
                             KENT_LENGTH, "axis + hg/2", "10.2",
                             "depth of the block's base");
    }
    kent_derivation_work(d, "V", b->volume, KENT_VOLUME, "a*a*hg", "10.8", "concrete");
    if (lifts) {
        derive_reached(w, h, KENT_UPWARD, wet ? "Fup/(V*gb)" : "Fup/(V*gc)");
    }
    if (down > 0.0) derive_reached(w, h, KENT_DOWNWARD, "Fdn/(a*a*qv)");
}

static void derive_base(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;
    const kent_block *b = &h->block;
    const double down = w->demand.load[KENT_DOWNWARD], q = w->site.vertical;
    const bool lifted = w->demand.load[KENT_UPWARD] > 0.0;

    kent_derivation_heading(d, "Base for the downward thrust");
    derive_depth(w, h);
    kent_derivation_put(d, "qv", q, KENT_STRESS, kent_soil_source(w->soil),
                        "bearing under a base");
    kent_derivation_work(d, "A0", down / q, KENT_AREA, "Fdn/qv", "10.16",
                         "base area asked for");
    kent_derivation_work(d, "b1", b->width, KENT_LENGTH, UP("max(sqrt(A0), OD)"),
                         "10.17", "along the pipe");
    kent_derivation_work(d, "b2", b->height, KENT_LENGTH, UP("max(A0/b1, OD)"), "10.17",
                         "across");
    const kent_face plan = {.width = b->width, .height = b->height};
    const double deep = kent_site_thickness(r, &w->site, plan, KENT_DOWNWARD);
    kent_concrete_derive_thickness(
        w, d, plan, deep, "max(b1, b2)",
        "thickness: spread from pipe to base within 45 degrees");
    if (lifted) {
        const bool wet = derive_concrete(w, h);
        kent_derivation_work(d, "tw", b->thickness, KENT_LENGTH,
                             wet ? "max(t, " UP("Fup/gb/(b1*b2)") ")"
                                 : "max(t, " UP("Fup/gc/(b1*b2)") ")",
                             "10.13", "thickness that also weighs enough");
    }
    kent_derivation_work(d, "V", b->volume, KENT_VOLUME,
                         lifted ? "b1*b2*tw" : "b1*b2*t", "10.8", "concrete");
    kent_derivation_work(d, "qr", w->use[KENT_DOWNWARD] * q, KENT_STRESS, "Fdn/(b1*b2)",
                         "10.9", "bearing pressure reached");
    derive_reached(w, h, KENT_DOWNWARD, "qr/qv");
    if (lifted) {
        derive_reached(w, h, KENT_UPWARD, b->submerged ? "Fup/(V*gb)" : "Fup/(V*gc)");
    }
}

void kent_block_derive(const kent_holding_work *w, kent_holding *h)
{
    if (h->block.type == KENT_BLOCK_NONE) return;
    if (w->demand.load[KENT_SIDEWAYS] > 0.0) derive_face(w, h);
    if (h->block.type == KENT_BLOCK_BEARING) derive_bearing_upright(w, h);
    if (h->block.type == KENT_BLOCK_GRAVITY) derive_gravity(w, h);
    if (h->block.type == KENT_BLOCK_BASE) derive_base(w, h);
}

/* A curve that the soil beside it holds. */
void kent_curve_derive(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;

    if (!h->soil_beside || isnan(h->utilisation)) return;
    kent_derivation_heading(d, "Side load along the curve");
    kent_derivation_put(d, "theta", w->fitting->angle, KENT_ANGLE, KENT_COMPUTED,
                        "turn of the curve");
    kent_derivation_put(d, "Rc", w->fitting->curve_radius, KENT_LENGTH, KENT_COMPUTED,
                        "its radius");
    kent_derivation_work(d, "ws", w->side_load, KENT_FORCE_PER_LENGTH,
                         "Fh/(2*sin(theta/2)*Rc)", "10.28", "side load, factored");
    derive_depth(w, h);
    kent_bearing_derive(w, h, d);
    kent_derivation_work(d, "qr", w->side_load / w->site.diameter, KENT_STRESS, "ws/OD",
                         "10.29", "bearing pressure reached on the pipe");
    derive_reached(w, h, KENT_SIDEWAYS, "qr/q");
}
