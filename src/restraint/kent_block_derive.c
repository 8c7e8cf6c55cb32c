/* The block's part of a hand calculation: depths, areas, sides, what is reached. */
#include "kent_concrete_internal.h"
#include "kent_earth.h"
#include "kent_side_internal.h"
#include "kent_stability_internal.h"
#include "kent_wedge.h"

#include <stdio.h>

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

/* Where the rules ask for a block taller than the pipe. */
static void derive_least_height(const kent_holding_work *w, kent_derivation *d)
{
    const kent_rules *r = &w->m->rules;

    rule(d, "hmin", r->least_height, KENT_LENGTH, "least height");
    if (!(r->height_over_diameter > 0.0)) return;
    rule(d, "hod", r->height_over_diameter, KENT_LENGTH,
         "that a block is taller than the pipe by");
    kent_derivation_work(d, "hmin", kent_block_least_height(r, &w->site), KENT_LENGTH,
                         "max(hmin, OD + hod)", "10.34", "least height here");
}

/* The steps by which a side, worked out last as symbol, was enlarged. */
static void derive_widened(kent_derivation *d, const kent_block *b, const char *symbol,
                           double value)
{
    char formula[48];

    if (b->widened == 0) return;
    kent_derivation_put(d, "n", (double)b->widened, KENT_RATIO, KENT_COMPUTED,
                        "steps by which it is enlarged until it stays in place");
    (void)snprintf(formula, sizeof formula, "%s + n*step", symbol);
    kent_derivation_work(d, symbol, value, KENT_LENGTH, formula, "20.17", "enlarged");
}

static void derive_height_limit(const kent_holding_work *w, kent_derivation *d)
{
    const kent_rules *r = &w->m->rules;

    rule(d, "hd", r->height_to_depth, KENT_RATIO, "height over depth of base, at most");
    kent_derivation_work(d, "hmax", kent_face_height_limit(r, kent_site_axis(&w->site)),
                         KENT_LENGTH, "hd*axis/(1 - hd/2)", "10.3",
                         "greatest height of the face");
}

static void derive_sides(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;
    const kent_face *face = &h->block.face;
    const bool hole = w->site.hole > 0.0;
    const double axis = kent_site_axis(&w->site);

    derive_height_limit(w, d);
    if (r->height_over_diameter > 0.0) derive_least_height(w, d);
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
    const kent_block *b = &h->block;
    const double spread = kent_site_thickness(r, &w->site, *face, KENT_SIDEWAYS);
    const double all = w->site.all_round ? fmax(spread, face->width) : spread;
    const double t = b->type == KENT_BLOCK_BEARING ? b->thickness : all;
    kent_concrete_derive_thickness(
        w, d, *face, spread, "max(w, h)",
        "thickness: spread from pipe to face within 45 degrees");
    if (w->site.all_round) {
        kent_derivation_work(d, "t", all, KENT_LENGTH, "max(t, w)", "9.19",
                             "and as wide on its other sides");
    }
    if (b->type == KENT_BLOCK_BEARING) derive_widened(d, b, "t", t);
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
    const bool rubs = kent_soil_way(w->soil) == KENT_WAY_COULOMB && !isnan(phi);
    if (rubs) {
        kent_derivation_put(d, "psi", kent_passive_plane(phi, w->soil->wall_friction),
                            KENT_ANGLE, KENT_COMPUTED,
                            "plane that the wedge slides up along (21.13)");
    }
    kent_derivation_work(
        d, "R", w->reach, KENT_LENGTH, rubs ? "base/tan(psi)" : "base*tan(45 + phi/2)",
        rubs ? "21.13" : "10.25", "wedge of ground before the face, at the surface");
}

/* The side of the gravity block above, as the face. */
static void derive_own_side(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;

    derive_height_limit(w, d);
    rule(d, "rx", r->width_to_height[1], KENT_RATIO, "width over height, at most");
    kent_derivation_work(d, "h", h->block.face.height, KENT_LENGTH, "hg", "20.15",
                         "height of the block's side");
    kent_derivation_work(d, "w", h->block.face.width, KENT_LENGTH,
                         "min(a, -ceil(-(rx*h)/step - " KENT_SIDE_SLACK_TEXT ")*step)",
                         "20.15", "width of it that counts");
    kent_derivation_work(d, "base", kent_site_axis(&w->site) + 0.5 * h->block.height,
                         KENT_LENGTH, "axis + h/2", "10.2",
                         "depth of the block's base");
}

static void derive_face(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const double load = w->demand.load[KENT_SIDEWAYS], q = w->site.allowable;
    const bool hole = w->site.hole > 0.0;

    kent_derivation_heading(d, h->block.own_side
                                   ? "Side of the block for the sideways thrust"
                                   : "Face for the sideways thrust");
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
    if (h->block.own_side) {
        derive_own_side(w, h);
    } else {
        derive_sides(w, h);
    }
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

/* The part of the side that the ground, or what presses down, asks for. */
static void gravity_side(const kent_holding_work *w, kent_holding *h, double volume)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;
    const double down = w->demand.load[KENT_DOWNWARD];
    const double tall = kent_block_least_height(r, &w->site);
    kent_site site = w->site;
    site.low = h->block.low;
    const double shallow = kent_gravity_shallow(r, &site, volume);
    const char *by_weight = "0", *by_plan = "0";
    char formula[160];
    double side = 0.0;

    if (volume > 0.0 && shallow > cbrt(volume)) {
        if (site.low) derive_height_limit(w, d);
        kent_derivation_work(
            d, "top", kent_gravity_most(r, &site), KENT_LENGTH,
            site.low ? "-ceil(-hmax/step - " KENT_SIDE_SLACK_TEXT ")*step"
                     : "-ceil(-(2*axis)/step - " KENT_SIDE_SLACK_TEXT ")*step",
            site.low ? "20.15" : "10.15",
            site.low ? "height up to which its side is a face"
                     : "height at which it would reach the ground");
        by_weight = "sqrt(V0/top)";
    } else if (volume > 0.0) {
        by_weight = "V0^(1/3)";
    }
    side = fmax(cbrt(volume), shallow);
    if (down > 0.0) by_plan = "sqrt(A0)";
    if (down > 0.0) side = fmax(side, sqrt(down / w->site.vertical));
    if (r->height_over_diameter > 0.0) {
        side = fmax(side, tall);
        (void)snprintf(formula, sizeof formula, UP("max(max(%s, %s), hmin)"), by_weight,
                       by_plan);
    } else if (down > 0.0 && volume > 0.0) {
        (void)snprintf(formula, sizeof formula, UP("max(%s, %s)"), by_weight, by_plan);
    } else {
        (void)snprintf(formula, sizeof formula, UP("%s"),
                       volume > 0.0 ? by_weight : by_plan);
    }
    kent_derivation_work(d, "a", kent_side_up(side, r->side_step), KENT_LENGTH, formula,
                         "10.14", "side of a square plan");
}

/* Height by the side that stands when symbol a was worked out last. */
static void gravity_height(kent_holding *h, double volume)
{
    kent_derivation_work(&h->derivation, "hg", h->block.height, KENT_LENGTH,
                         volume > 0.0 ? UP("max(V0/(a*a), hmin)") : UP("hmin"), "10.15",
                         "height");
}

/* Side and height of a block whose soil above counts: the least in steps. */
static void gravity_beneath(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_block *b = &h->block;
    const bool wet = !isinf(w->site.water_table);

    kent_derivation_put(d, "a", b->width, KENT_LENGTH, KENT_COMPUTED,
                        "side, the least in steps with which block and soil weigh "
                        "enough and all below (20.14)");
    kent_derivation_put(d, "hg", b->height, KENT_LENGTH, KENT_COMPUTED,
                        "height, of those the least");
    kent_derivation_put(d, "gs", w->soil->unit_weight, KENT_UNIT_WEIGHT,
                        kent_soil_source(w->soil), "unit weight of the soil");
    const double top = fmax(0.0, kent_site_axis(&w->site) - 0.5 * b->height);
    kent_derivation_work(d, "zt", top, KENT_LENGTH, "max(0, axis - hg/2)", "20.4",
                         "depth of the block's top");
    if (wet) {
        kent_derivation_put(d, "zw", w->site.water_table, KENT_LENGTH, KENT_GIVEN,
                            "depth of the water table");
        rule(d, "gw", w->m->rules.water_unit_weight, KENT_UNIT_WEIGHT,
             "unit weight of ground water");
    }
    kent_derivation_work(
        d, "S",
        kent_gravity_prism(&w->m->rules, &w->site, b->width * b->width, b->height),
        KENT_FORCE, wet ? "a*a*(gs*zt - gw*max(0, zt - zw))" : "a*a*gs*zt", "20.4",
        "soil straight above the block");
}

static void derive_gravity(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;
    const kent_block *b = &h->block;
    const double up = w->demand.load[KENT_UPWARD];
    const double down = w->demand.load[KENT_DOWNWARD];
    const bool lifts = up > 0.0;
    const bool soil =
        lifts && kent_gravity_under_soil(r, &w->site) &&
        kent_gravity_most(r, &w->site) >= kent_block_least_height(r, &w->site);

    kent_derivation_heading(d, lifts ? "Weight for the upward thrust"
                                     : "Footing for the downward thrust");
    derive_depth(w, h);
    const bool wet = lifts && derive_concrete(w, h);
    const double unit_weight =
        r->concrete_unit_weight - (wet ? r->water_unit_weight : 0.0);
    const double volume = kent_gravity_volume(up, 1.0, unit_weight);
    if (lifts && !soil) {
        kent_derivation_work(d, "V0", volume, KENT_VOLUME, wet ? "Fup/gb" : "Fup/gc",
                             "10.13", "concrete that weighs as much");
    }
    if (down > 0.0) {
        kent_derivation_put(d, "qv", w->site.vertical, KENT_STRESS,
                            kent_soil_source(w->soil), "bearing under a base");
        kent_derivation_work(d, "A0", down / w->site.vertical, KENT_AREA, "Fdn/qv",
                             "10.16", "area that carries the downward thrust");
    }
    derive_least_height(w, d);
    if (soil) {
        gravity_beneath(w, h);
    } else {
        gravity_side(w, h, volume);
        if (!b->flatter) gravity_height(h, volume);
        derive_widened(d, b, "a", b->width);
        if (b->flatter) gravity_height(h, volume);
    }
    if (!isnan(kent_site_axis(&w->site))) {
        kent_derivation_work(d, "base", kent_site_axis(&w->site) + 0.5 * b->height,
                             KENT_LENGTH, "axis + hg/2", "10.2",
                             "depth of the block's base");
    }
    kent_derivation_work(d, "V", b->volume, KENT_VOLUME, "a*a*hg", "10.8", "concrete");
    if (lifts && soil) {
        derive_reached(w, h, KENT_UPWARD, wet ? "Fup/(V*gb + S)" : "Fup/(V*gc + S)");
    } else if (lifts) {
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
    const double more = (double)b->widened * r->side_step;
    kent_derivation_work(d, "b1", b->width - more, KENT_LENGTH, UP("max(sqrt(A0), OD)"),
                         "10.17", "along the pipe");
    kent_derivation_work(d, "b2", b->height - more, KENT_LENGTH, UP("max(A0/b1, OD)"),
                         "10.17", "across");
    derive_widened(d, b, "b1", b->width);
    derive_widened(d, b, "b2", b->height);
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
    const bool sideways = w->demand.load[KENT_SIDEWAYS] > 0.0;

    if (sideways && !h->block.own_side) derive_face(w, h);
    if (h->block.type == KENT_BLOCK_BEARING) derive_bearing_upright(w, h);
    if (h->block.type == KENT_BLOCK_GRAVITY) derive_gravity(w, h);
    if (h->block.type == KENT_BLOCK_BASE) derive_base(w, h);
    if (sideways && h->block.own_side) derive_face(w, h);
    kent_stability_derive(w, h);
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
