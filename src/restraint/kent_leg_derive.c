/* The restrained length's part of a hand calculation, one leg at a time. */
#include "kent_holding_internal.h"
#include "kent_side_internal.h"

#include <stdio.h>

static const double STANDARD_GRAVITY = 9.80665; /* m/s2: what nobody states */

/* What a metre of pipe weighs, empty and full, and the ground water it displaces. */
static void derive_weight(const kent_holding_work *w, const kent_leg_work *k,
                          const kent_leg_piece *at, kent_derivation *d)
{
    const kent_pipe *p = k->pipe;
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
        kent_derivation_work(d, "Wp", k->pipe_weight, KENT_FORCE_PER_LENGTH,
                             "pi*(OD - e)*e*rp*g", "11.1", "weight of the pipe");
    } else {
        kent_derivation_put(d, "Wp", k->pipe_weight, KENT_FORCE_PER_LENGTH,
                            KENT_CATALOGUE, "weight of the pipe");
    }
    kent_derivation_put(d, "ID", bore, KENT_DIAMETER, listed, "bore");
    kent_derivation_put(d, "rho", w->m->water.density, KENT_DENSITY, KENT_COMPUTED,
                        "density of the water");
    kent_derivation_work(d, "Ww", at->trench.water_weight, KENT_FORCE_PER_LENGTH,
                         "rho*g*pi*ID^2/4", "11.2", "weight of the water in it");
    kent_derivation_put(d, "gt", at->soil->unit_weight, KENT_UNIT_WEIGHT,
                        kent_soil_source(at->soil), "unit weight of the soil in place");
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
    const kent_source from = kent_soil_source(at->soil);
    const kent_trench *t = &at->trench;
    const double adhesion = at->grip.friction_whole - at->grip.friction; /* of half */
    const double friction = k->bend ? at->grip.friction : at->grip.friction_whole;
    const bool sticks = t->cohesion > 0.0, wet = at->displaced > 0.0;
    const bool sleeved = k->sleeve < 1.0;

    kent_derivation_work(d, "We", at->grip.earth_load, KENT_FORCE_PER_LENGTH,
                         wet ? "ge*cover*OD" : "gt*cover*OD", "11.3",
                         "weight of the soil above");
    kent_derivation_work(
        d, "W", 2.0 * at->grip.earth_load + t->pipe_weight + t->water_weight,
        KENT_FORCE_PER_LENGTH, wet ? "2*We + Wp + Ww - Wb" : "2*We + Wp + Ww", "11.4",
        "load on top and bottom of the pipe");
    kent_derivation_put(d, "phi", t->friction_angle, KENT_ANGLE, from,
                        "friction angle of the soil");
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

static void derive_bearing(const kent_leg_piece *at, kent_derivation *d)
{
    const kent_trench *t = &at->trench;
    const double stress = t->unit_weight * (t->cover + 0.5 * t->outside_diameter);
    const int kind = at->trench_kind;
    const bool of_trench = kind >= 0 && !isnan(at->soil->passive_by_trench[kind]);
    char says[120];

    kent_derivation_work(d, "Kp", kent_rankine_passive(t->friction_angle), KENT_RATIO,
                         "(1 + sin(phi))/(1 - sin(phi))", "10.18",
                         "passive coefficient by Rankine");
    kent_derivation_work(d, "sa", stress, KENT_STRESS,
                         at->displaced > 0.0 ? "ge*(cover + OD/2)"
                                             : "gt*(cover + OD/2)",
                         "11.6", "weight of soil above the axis");
    kent_derivation_work(
        d, "Pp", kent_passive_pressure(t->friction_angle, t->cohesion, stress),
        KENT_STRESS, "Kp*sa + 2*c*sqrt(Kp)", "11.6", "passive pressure at the axis");
    (void)snprintf(says, sizeof says, "share of it that a trench of %s mobilises",
                   kent_trench_word(kind));
    kent_derivation_put(d, "Kn", t->passive_ratio, KENT_RATIO,
                        kent_soil_source(at->soil),
                        of_trench ? says : "share of it that this trench mobilises");
    kent_derivation_work(d, "Rs", at->bearing, KENT_FORCE_PER_LENGTH, "Kn*Pp*OD",
                         "11.7", "resistance of the trench side");
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

static void derive_length(const kent_leg_work *k, kent_derivation *d)
{
    if (!k->bend) {
        kent_derivation_work(d, "L", k->length, KENT_LENGTH, "SF*T/Fs", "11.10",
                             "restrained length, by friction alone");
        return;
    }
    if (k->turns_back) {
        kent_derivation_work(d, "L", k->length, KENT_LENGTH, "SF*S/Fs", "11.10",
                             "restrained length, by friction alone: beyond a right "
                             "angle the legs are drawn along themselves");
        return;
    }
    kent_derivation_work(
        d, "L", k->length, KENT_LENGTH,
        k->bears ? "SF*S*tan(theta/2)/(Fs + Rs/2)" : "SF*S*tan(theta/2)/Fs", "11.9",
        k->bears ? "restrained length" : "restrained length, by friction alone");
}

/* ---- over several kinds of ground ------------------------------------------------ */

/* What one piece holds per metre: r1, r2 ... and, but for the last, its length. */
static void derive_piece(const kent_holding_work *w, const kent_leg_work *k,
                         size_t index, kent_derivation *d)
{
    const kent_leg_piece *at = &k->piece[index];
    const bool last = index + 1 == k->piece_count;
    char symbol[24], says[160];

    (void)snprintf(says, sizeof says, "Part %zu of %zu, in %s", index + 1,
                   k->piece_count, at->soil->id);
    kent_derivation_heading(d, says);
    (void)snprintf(symbol, sizeof symbol, "r%zu", index + 1);
    if (at->counts) {
        derive_weight(w, k, at, d);
        derive_friction(k, at, d);
        if (k->bears) derive_bearing(at, d);
        kent_derivation_work(d, symbol, at->resistance, KENT_FORCE_PER_LENGTH,
                             k->bears ? "Fs + Rs/2" : "Fs", "11.15",
                             "what a metre of this part holds");
    } else {
        kent_derivation_put(d, symbol, 0.0, KENT_FORCE_PER_LENGTH, KENT_COMPUTED,
                            "ground that can't be relied on holds nothing");
    }
    if (last) return;
    (void)snprintf(symbol, sizeof symbol, "L%zu", index + 1);
    kent_derivation_put(d, symbol, at->length, KENT_LENGTH, KENT_COMPUTED,
                        "length of this part, up to the edge of a zone");
}

/* L = L1 + L2 + (D - r1 L1 - r2 L2)/r3 */
static void derive_sum(const kent_leg_work *k, kent_derivation *d)
{
    const char *demand = !k->bend        ? "SF*T"
                         : k->turns_back ? "SF*S"
                                         : "SF*S*tan(theta/2)";
    char formula[160] = "";
    size_t used = 0;

    kent_derivation_heading(d, "Length over all parts");
    kent_derivation_work(d, "D", k->demand, KENT_FORCE, demand, "11.16",
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

void kent_leg_derive(const kent_holding_work *w, kent_holding *h, const kent_leg *leg)
{
    kent_derivation *d = &h->derivation;
    const kent_port *p = &w->m->ports[w->fitting->port_first + leg->port];
    kent_leg_work k;
    char says[160];

    if (kent_leg_prepare(w->m, w->fitting, leg->port, w->pull, w->pull_factor, &k)) {
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
        derive_weight(w, &k, &k.piece[0], d);
        derive_friction(&k, &k.piece[0], d);
        if (k.bears) derive_bearing(&k.piece[0], d);
        derive_pull(w, h, &k, d);
        derive_length(&k, d);
    } else {
        derive_pull(w, h, &k, d);
        for (size_t i = 0; i < k.piece_count; i++) {
            derive_piece(w, &k, i, d);
        }
        derive_sum(&k, d);
    }
    if (leg->pipes <= 0) return;
    kent_derivation_put(d, "lp", k.pipe->laying_length, KENT_LENGTH, KENT_GIVEN,
                        "length of one pipe");
    kent_derivation_work(d, "n", leg->pipes, KENT_RATIO,
                         "ceil(L/lp - " KENT_SIDE_SLACK_TEXT ")", "11.11",
                         "whole pipes with restrained joints");
}
