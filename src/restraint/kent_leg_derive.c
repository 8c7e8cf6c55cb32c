/* The restrained length's part of a hand calculation, one leg at a time. */
#include "kent_holding_internal.h"
#include "kent_side_internal.h"

#include <stdio.h>

/* Relative: lengths by two forms that differ by less are one. */
static const double SAME_LENGTH = 1e-9;

static const double STANDARD_GRAVITY = 9.80665; /* m/s2: what nobody states */

/* What a metre of pipe weighs, empty and full, and the ground water it displaces. */
static void derive_weight(const kent_holding_work *w, const kent_leg_piece *at,
                          kent_derivation *d)
{
    const kent_pipe *p = at->pipe;
    const double bore = p->inside_diameter;

    const kent_source listed = p->pipe_class[0] ? KENT_CATALOGUE : KENT_GIVEN;

    kent_derivation_put(d, "OD", p->outside_diameter, KENT_DIAMETER, listed,
                        "outside diameter of the leg's pipe");
    kent_derivation_put(d, "cover", at->trench.cover, KENT_LENGTH, KENT_GIVEN,
                        "ground to crown");
    kent_derivation_put(d, "g", w->m->gravity, KENT_ACCELERATION,
                        w->m->gravity == STANDARD_GRAVITY ? KENT_ASSUMED : KENT_GIVEN,
                        "gravity");
    if (isnan(p->unit_mass)) {
        kent_derivation_put(d, "e", p->wall, KENT_DIAMETER, listed, "wall, nominal");
        kent_derivation_put(d, "rp", p->material_density, KENT_DENSITY, KENT_CATALOGUE,
                            "density of the wall");
        kent_derivation_work(d, "Wp", at->pipe_weight, KENT_FORCE_PER_LENGTH,
                             "pi*(OD - e)*e*rp*g", "11.1", "weight of the pipe");
    } else {
        kent_derivation_put(d, "Wp", at->pipe_weight, KENT_FORCE_PER_LENGTH,
                            KENT_CATALOGUE, "weight of the pipe");
    }
    kent_derivation_put(d, "ID", bore, KENT_DIAMETER, listed, "bore");
    kent_derivation_put(d, "rho", w->m->water.density, KENT_DENSITY, KENT_COMPUTED,
                        "density of the water");
    kent_derivation_work(d, "Ww", at->trench.water_weight, KENT_FORCE_PER_LENGTH,
                         "rho*g*pi*ID^2/4", "11.2", "weight of the water in it");
    kent_derivation_put(d, "gt", at->fill->unit_weight, KENT_UNIT_WEIGHT,
                        kent_soil_source(at->fill),
                        at->fill == at->soil ? "unit weight of the soil in place"
                                             : "unit weight of the backfill in place");
    if (at->displaced <= 0.0) return;
    kent_derivation_put(d, "gw", w->m->rules.water_unit_weight, KENT_UNIT_WEIGHT,
                        KENT_CATALOGUE, "unit weight of ground water");
    kent_derivation_work(d, "ge", at->trench.unit_weight, KENT_UNIT_WEIGHT, "gt - gw",
                         "11.12", "unit weight of the soil under water");
    kent_derivation_work(d, "Wb", at->displaced, KENT_FORCE_PER_LENGTH, "gw*pi*OD^2/4",
                         "11.13", "weight of the ground water displaced");
}

static void derive_friction(const kent_leg_work *k, const kent_leg_piece *at,
                            kent_derivation *d)
{
    const kent_source from = kent_soil_source(at->fill);
    const kent_trench *t = &at->trench;
    const double adhesion = at->grip.friction_whole - at->grip.friction; /* of half */
    const double friction = k->bend ? at->grip.friction : at->grip.friction_whole;
    const bool sticks = t->cohesion > 0.0, wet = at->displaced > 0.0;
    const bool sleeved = k->sleeve < 1.0;
    char formula[64];

    kent_derivation_work(d, "We", at->grip.earth_load, KENT_FORCE_PER_LENGTH,
                         wet ? "ge*cover*OD" : "gt*cover*OD", "11.3",
                         "weight of the soil above");
    if (at->rise != 0.0) {
        kent_derivation_put(d, "b", fabs(t->slope), KENT_ANGLE, KENT_COMPUTED,
                            at->rise > 0.0 ? "slope of the pipe, uphill along the leg"
                                           : "slope of the pipe, downhill along the "
                                             "leg");
    }
    (void)snprintf(formula, sizeof formula, at->rise != 0.0 ? "(%s)*cos(b)" : "%s",
                   wet ? "2*We + Wp + Ww - Wb" : "2*We + Wp + Ww");
    kent_derivation_work(
        d, "W",
        (2.0 * at->grip.earth_load + t->pipe_weight + t->water_weight) * cos(t->slope),
        KENT_FORCE_PER_LENGTH, formula, at->rise != 0.0 ? "11.22" : "11.4",
        "load on top and bottom of the pipe");
    kent_derivation_put(d, "phi", t->friction_angle, KENT_ANGLE, from,
                        at->fill == at->soil ? "friction angle of the soil"
                                             : "friction angle of the backfill");
    kent_derivation_put(d, "fphi", t->friction_ratio, KENT_RATIO, from,
                        "friction angle on the pipe over it");
    kent_derivation_put(d, "c", t->cohesion, KENT_STRESS, from, "cohesion");
    if (sticks) {
        kent_derivation_put(d, "fc", t->adhesion_ratio, KENT_RATIO, from,
                            "adhesion on the pipe over cohesion");
        kent_derivation_work(d, "Fc", k->bend ? adhesion : 2.0 * adhesion,
                             KENT_FORCE_PER_LENGTH,
                             k->bend ? "pi*OD/2*fc*c" : "pi*OD*fc*c", "11.5",
                             k->bend ? "adhesion on half the perimeter"
                                     : "adhesion on the whole perimeter");
    }
    kent_derivation_work(d, sleeved ? "Fs0" : "Fs", friction, KENT_FORCE_PER_LENGTH,
                         sticks ? "Fc + W*tan(fphi*phi)" : "W*tan(fphi*phi)", "11.5",
                         "friction on the pipe");
    if (!sleeved) return;
    kent_derivation_put(d, "kw", k->sleeve, KENT_RATIO, KENT_CATALOGUE,
                        "sleeved pipe over bare pipe");
    kent_derivation_work(d, "Fs", at->friction, KENT_FORCE_PER_LENGTH, "kw*Fs0",
                         "11.14", "friction on the sleeved pipe");
}

/* The soil of the trench side, where the backfill is another. */
static void derive_side(const kent_leg_piece *at, kent_derivation *d)
{
    const kent_source from = kent_soil_source(at->soil);
    const bool wet = at->displaced > 0.0;

    if (at->fill == at->soil) return;
    kent_derivation_put(d, wet ? "gt" : "gn", at->soil->unit_weight, KENT_UNIT_WEIGHT,
                        from, "unit weight of the native soil");
    if (wet) {
        kent_derivation_work(d, "gn", at->side.unit_weight, KENT_UNIT_WEIGHT, "gt - gw",
                             "11.12", "unit weight of it under water");
    }
    kent_derivation_put(d, "phi", at->side.friction_angle, KENT_ANGLE, from,
                        "friction angle of the native soil");
    kent_derivation_put(d, "c", at->side.cohesion, KENT_STRESS, from,
                        "cohesion of the native soil");
}

/* The passive pressure at the axis and what of it counts, by either form. */
static void derive_bearing(const kent_leg_piece *at, kent_length_form form,
                           kent_derivation *d)
{
    const kent_trench *t = &at->side;
    const double stress = t->unit_weight * (t->cover + 0.5 * t->outside_diameter);
    const int kind = at->trench_kind;
    const bool of_trench = kind >= 0 && !isnan(at->soil->passive_by_trench[kind]);
    const bool etl = form == KENT_FORM_ETL;
    const char *weight = at->fill != at->soil  ? "gn*(cover + OD/2)"
                         : at->displaced > 0.0 ? "ge*(cover + OD/2)"
                                               : "gt*(cover + OD/2)";
    char says[120];

    derive_side(at, d);
    kent_derivation_work(d, "Kp", kent_rankine_passive(t->friction_angle), KENT_RATIO,
                         "(1 + sin(phi))/(1 - sin(phi))", "10.18",
                         "passive coefficient by Rankine");
    kent_derivation_work(d, "sa", stress, KENT_STRESS, weight, "11.6",
                         "weight of soil above the axis");
    kent_derivation_work(
        d, "Pp",
        kent_passive_pressure(t->friction_angle, etl ? 0.0 : t->cohesion, stress),
        KENT_STRESS, etl ? "Kp*sa" : "Kp*sa + 2*c*sqrt(Kp)", etl ? "11.19" : "11.6",
        etl ? "passive pressure at the axis, without cohesion"
            : "passive pressure at the axis");
    (void)snprintf(says, sizeof says, "share of it that a trench of %s mobilises",
                   kent_trench_word(kind));
    kent_derivation_put(d, "Kn", t->passive_ratio, KENT_RATIO,
                        kent_soil_source(at->soil),
                        of_trench ? says : "share of it that this trench mobilises");
    kent_derivation_work(d, "Rs", at->bearing, KENT_FORCE_PER_LENGTH, "Kn*Pp*OD",
                         etl ? "11.19" : "11.7", "resistance of the trench side");
}

/* What the weight of pipe and water asks for on the way up. */
static void derive_slope(const kent_leg_work *k, const kent_leg_piece *at,
                         kent_derivation *d)
{
    if (!(at->slope_load > 0.0)) return;
    kent_derivation_put(d, "SF", k->factor, KENT_RATIO, KENT_COMPUTED,
                        "factor on the thrust, and on the weight along the slope");
    kent_derivation_work(d, "Gs", at->slope_load, KENT_FORCE_PER_LENGTH,
                         "SF*(Wp + Ww)*sin(b)", "11.23",
                         "pipe and water draw down the slope");
}

/* Friction, bearing and slope of one piece, and what they come to. */
static void derive_metre(const kent_holding_work *w, const kent_leg_work *k,
                         const kent_leg_piece *at, kent_derivation *d)
{
    derive_weight(w, at, d);
    derive_friction(k, at, d);
    if (k->bears) derive_bearing(at, k->form, d);
    derive_slope(k, at, d);
}

/* "Fs + Rs/2 - Gs" */
static const char *metre_formula(const kent_leg_work *k, const kent_leg_piece *at)
{
    const bool uphill = at->slope_load > 0.0;

    if (k->bears) return uphill ? "Fs + Rs/2 - Gs" : "Fs + Rs/2";
    return uphill ? "Fs - Gs" : "Fs";
}

/* The whole thrust, and of a bend the pull along each leg. */
static void derive_pull(const kent_holding_work *w, const kent_holding *h,
                        const kent_leg_work *k, kent_derivation *d)
{
    const kent_load_case *c = &w->loads->cases[h->by_sense[KENT_RESULTANT]];
    char says[120];

    (void)snprintf(says, sizeof says, "%s, case '%s'",
                   h->joints_share < 1.0 ? "the joints' part of the thrust"
                                         : "whole thrust",
                   c->name);
    kent_derivation_put(d, "T", kent_vec3_length(w->pull), KENT_FORCE, KENT_COMPUTED,
                        says);
    kent_derivation_put(d, "SF", k->factor, KENT_RATIO, kent_factor_source(w->m, c),
                        kent_factor_says(w->m, c));
    if (!k->bend) return;
    kent_derivation_put(d, "theta", k->angle, KENT_ANGLE, KENT_COMPUTED,
                        "turn of the bend in space");
    kent_derivation_work(d, "S", k->force, KENT_FORCE, "T/(2*sin(theta/2))", "11.8",
                         "pull along each leg");
}

/* What the ground beside a tee's restrained run takes of the branch's thrust. */
static void derive_run(const kent_holding_work *w, const kent_leg_work *k,
                       kent_derivation *d)
{
    if (!(k->credit > 0.0)) return;
    kent_derivation_put(d, "Lr", k->run[0] + k->run[1], KENT_LENGTH, KENT_GIVEN,
                        "run of the tee with restrained joints");
    kent_derivation_put(d, "Rr", k->run_bearing[0] + k->run_bearing[1], KENT_FORCE,
                        KENT_COMPUTED,
                        "bearing of the ground beside it, Rs by 11.7 along it");
    kent_derivation_put(d, "kr", w->m->rules.run_share, KENT_RATIO, KENT_CATALOGUE,
                        "share of it that the design rules count");
    kent_derivation_work(d, "C", k->credit, KENT_FORCE, "kr*Rr", "11.20",
                         "what the run takes");
}

/* The demand's formula, "SF*S*tan(theta/2)". */
static const char *demand_formula(const kent_leg_work *k)
{
    if (!k->bend) return k->credit > 0.0 ? "max(0, SF*T - C)" : "SF*T";
    return k->turns_back ? "SF*S" : "SF*S*tan(theta/2)";
}

static void derive_length(const kent_leg_work *k, kent_derivation *d)
{
    const kent_leg_piece *at = &k->piece[0];
    const char *metre = metre_formula(k, at);
    const bool sum = k->bears || at->slope_load > 0.0;
    const char *equation = !k->bend && k->credit > 0.0 ? "11.21"
                           : !k->bend || k->turns_back ? "11.10"
                           : k->form == KENT_FORM_ETL  ? "11.18"
                                                       : "11.9";
    char formula[120];

    (void)snprintf(formula, sizeof formula, sum ? "%s/(%s)" : "%s/%s",
                   demand_formula(k), metre);
    kent_derivation_work(d, "L", k->length, KENT_LENGTH, formula, equation,
                         k->bears ? "restrained length"
                         : k->turns_back
                             ? "restrained length, by friction alone: beyond a right "
                               "angle the legs are drawn along themselves"
                             : "restrained length, by friction alone");
}

/* The length by the other form, where it is another one. */
static void derive_other(const kent_leg_work *k, kent_derivation *d)
{
    const bool etl = k->form != KENT_FORM_ETL; /* the other one */
    const double other = k->by_form[etl ? KENT_FORM_ETL : KENT_FORM_HANDBOOK];

    if (!(fabs(other - k->length) > SAME_LENGTH * k->length)) return;
    kent_derivation_put(d, etl ? "L_etl" : "L_hb", other, KENT_LENGTH, KENT_COMPUTED,
                        etl ? "by USACE ETL 1110-3-446 (11.18), which counts no "
                              "cohesion in the trench side"
                            : "by iron-pipe handbooks (11.9), which count cohesion in "
                              "the trench side");
}

/* ---- over several kinds of ground ------------------------------------------------ */

static const char *free_says(kent_free free)
{
    switch (free) {
    case KENT_FREE_NOT:
    case KENT_FREE_SOIL:
        return "ground that can't be relied on holds nothing";
    case KENT_FREE_FILL:
        return "through backfill that can't be relied on nothing holds";
    case KENT_FREE_CASING:
        return "a casing holds nothing";
    case KENT_FREE_ABOVE:
        return "above ground nothing holds";
    }
    return "";
}

/* A stretch that holds nothing; uphill it draws on the others. */
static void derive_free(const kent_leg_piece *at, const char *symbol,
                        kent_derivation *d)
{
    kent_derivation_put(d, symbol, at->resistance, KENT_FORCE_PER_LENGTH, KENT_COMPUTED,
                        at->slope_load > 0.0
                            ? "nothing holds here, and pipe and water draw down the "
                              "slope (11.23)"
                            : free_says(at->free));
}

/* What one piece holds per metre: r1, r2 ... and, but for the last, its length. */
static void derive_piece(const kent_holding_work *w, const kent_leg_work *k,
                         size_t index, kent_derivation *d)
{
    const kent_leg_piece *at = &k->piece[index];
    const bool last = index + 1 == k->piece_count;
    const bool held = at->free == KENT_FREE_NOT && at->counts;
    char symbol[24], says[160];

    (void)snprintf(says, sizeof says, "Part %zu of %zu, in %s", index + 1,
                   k->piece_count,
                   at->free == KENT_FREE_CASING  ? "a casing"
                   : at->free == KENT_FREE_ABOVE ? "the open"
                                                 : at->soil->id);
    kent_derivation_heading(d, says);
    (void)snprintf(symbol, sizeof symbol, "r%zu", index + 1);
    if (held) {
        derive_metre(w, k, at, d);
        kent_derivation_work(d, symbol, at->resistance, KENT_FORCE_PER_LENGTH,
                             metre_formula(k, at), "11.15",
                             "what a metre of this part holds");
    } else {
        derive_free(at, symbol, d);
    }
    if (last) return;
    (void)snprintf(symbol, sizeof symbol, "L%zu", index + 1);
    kent_derivation_put(d, symbol, at->length, KENT_LENGTH, KENT_COMPUTED,
                        "length of this part, up to where the ground or the pipe "
                        "changes");
}

/* L = L1 + L2 + (D - r1 L1 - r2 L2)/r3 */
static void derive_sum(const kent_leg_work *k, kent_derivation *d)
{
    char formula[160] = "";
    size_t used = 0;

    kent_derivation_heading(d, "Length over all parts");
    kent_derivation_work(d, "D", k->demand, KENT_FORCE, demand_formula(k), "11.16",
                         "what the leg must hold");
    for (size_t i = 1; i < k->piece_count; i++) {
        used += (size_t)snprintf(formula + used, sizeof formula - used, "L%zu + ", i);
    }
    used += (size_t)snprintf(formula + used, sizeof formula - used, "(D");
    for (size_t i = 1; i < k->piece_count; i++) {
        used += (size_t)snprintf(formula + used, sizeof formula - used, " - r%zu*L%zu",
                                 i, i);
    }
    (void)snprintf(formula + used, sizeof formula - used, ")/r%zu", k->piece_count);
    kent_derivation_work(d, "L", k->length, KENT_LENGTH, formula, "11.17",
                         "restrained length, part by part");
}

/* An earlier leg of the same pipe and length, whose lines would only be repeated. */
static bool leg_repeats(const kent_holding_work *w, const kent_holding *h,
                        const kent_leg *leg)
{
    const kent_port *ports = &w->m->ports[w->fitting->port_first];
    const int pipe = w->m->spans[ports[leg->port].span].pipe;

    for (const kent_leg *k = h->legs; k < leg; k++) {
        const int other = w->m->spans[ports[k->port].span].pipe;
        if (other == pipe && !(fabs(k->length - leg->length) > 0.0)) return true;
    }
    return false;
}

/* Whole pipes; where the leg goes on through another pipe, or ends at something, they
 * were counted along it. */
static void derive_pipes(const kent_leg *leg, const kent_leg_work *k,
                         kent_derivation *d)
{
    const double laying = k->pipe->laying_length;

    if (leg->pipes <= 0) return;
    if (ceil(k->length / laying - KENT_SIDE_SLACK) != (double)leg->pipes) {
        kent_derivation_put(d, "n", leg->pipes, KENT_RATIO, KENT_COMPUTED,
                            "whole pipes with restrained joints, counted along it");
        return;
    }
    kent_derivation_put(d, "lp", laying, KENT_LENGTH, KENT_GIVEN, "length of one pipe");
    kent_derivation_work(d, "n", leg->pipes, KENT_RATIO,
                         "ceil(L/lp - " KENT_SIDE_SLACK_TEXT ")", "11.11",
                         "whole pipes with restrained joints");
}

void kent_leg_derive(const kent_holding_work *w, kent_holding *h, const kent_leg *leg)
{
    kent_derivation *d = &h->derivation;
    const kent_port *p = &w->m->ports[w->fitting->port_first + leg->port];
    kent_leg_work k;
    char says[160];

    if (kent_leg_prepare(w->m, w->standings, w->index, leg->port, w->pull,
                         w->pull_factor, &k)) {
        return;
    }
    const bool whole = k.piece_count == 1;
    const bool again = whole && leg_repeats(w, h, leg);
    (void)snprintf(says, sizeof says, "%s along %s%s%s",
                   again ? "The same length" : "Restrained length", k.pipe->id,
                   p->toward >= 0 ? " towards " : "",
                   p->toward >= 0 ? w->m->points[p->toward].id : "");
    kent_derivation_heading(d, says);
    if (again) return;
    if (whole) {
        derive_metre(w, &k, &k.piece[0], d);
        derive_pull(w, h, &k, d);
        derive_run(w, &k, d);
        derive_length(&k, d);
    } else {
        derive_pull(w, h, &k, d);
        derive_run(w, &k, d);
        for (size_t i = 0; i < k.piece_count; i++) {
            derive_piece(w, &k, i, d);
        }
        derive_sum(&k, d);
    }
    derive_other(&k, d);
    derive_pipes(leg, &k, d);
}
