/* What the soil gives a face, in the hand calculation: by its route, and the passive
 * coefficient that this takes. */
#include "kent_earth.h"
#include "kent_holding_internal.h"
#include "kent_said.h"

#include <stdio.h>

/* What counts on ground that falls before the face: Lf of what is stated, or Kp
 * outright. */
static const char *name_of_stated(const kent_holding_work *w)
{
    return w->site.falls > 0.0 ? "qo" : "q";
}

/* Effective stress at the axis: sv. */
static void derive_stress(const kent_holding_work *w, double unit_weight,
                          kent_source source, kent_derivation *d)
{
    const kent_bearing_place at = kent_site_place(&w->site, &w->m->rules);
    const bool wet = at.water_table < at.depth;

    kent_derivation_put(d, "gt", unit_weight, KENT_UNIT_WEIGHT, source,
                        source == KENT_ASSUMED ? "unit weight of the soil, not given"
                                               : "unit weight of the soil in place");
    if (wet) {
        kent_derivation_put(d, "gw", at.water, KENT_UNIT_WEIGHT, KENT_CATALOGUE,
                            "unit weight of ground water");
        kent_derivation_put(d, "zw", at.water_table, KENT_LENGTH, KENT_GIVEN,
                            "depth of the water table");
    }
    kent_derivation_work(d, "sv", kent_effective_stress(unit_weight, &at), KENT_STRESS,
                         wet ? "gt*axis - gw*(axis - zw)" : "gt*axis", "10.20",
                         "effective weight of soil above the axis");
}

/* The same as the mean over the tallest face, where the water table cuts it: sm. */
static const char *derive_mean_stress(const kent_holding_work *w, kent_derivation *d)
{
    const kent_bearing_place at = kent_site_place(&w->site, &w->m->rules);
    const kent_soil *s = w->site.leans;
    const double cut = kent_face_cut(at.depth, at.face, at.water_table);

    derive_stress(w, s->unit_weight, kent_soil_source(s), d);
    if (!(cut > 0.0)) return "sv";
    if (!(at.water_table < at.depth)) {
        kent_derivation_put(d, "gw", at.water, KENT_UNIT_WEIGHT, KENT_CATALOGUE,
                            "unit weight of ground water");
        kent_derivation_put(d, "zw", at.water_table, KENT_LENGTH, KENT_GIVEN,
                            "depth of the water table");
    }
    kent_derivation_put(d, "hm", at.face, KENT_LENGTH, KENT_COMPUTED,
                        "height of the tallest face here, which the water table cuts");
    kent_derivation_work(d, "sm", kent_mean_stress(s->unit_weight, &at), KENT_STRESS,
                         at.water_table < at.depth
                             ? "sv - gw*(hm/2 - axis + zw)^2/(2*hm)"
                             : "sv - gw*(hm/2 - zw + axis)^2/(2*hm)",
                         "21.6", "mean of it over that face");
    return "sm";
}

/* Pa: what the soil bears here on level ground. */
static double level_bearing(const kent_holding_work *w)
{
    kent_bearing_gap gap = KENT_BEARING_KNOWN;
    kent_bearing_place at = kent_site_place(&w->site, &w->m->rules);

    at.falls = 0.0;
    return kent_soil_bearing(w->site.leans, &at, &gap);
}

static void derive_constant(const kent_holding_work *w, kent_derivation *d)
{
    kent_derivation_put(d, name_of_stated(w), level_bearing(w), KENT_STRESS,
                        kent_soil_source(w->site.leans),
                        "allowable bearing of the soil");
}

static void derive_by_depth(const kent_holding_work *w, kent_derivation *d)
{
    const kent_soil *s = w->site.leans;
    const kent_source from = kent_soil_source(s);
    const double axis = kent_site_axis(&w->site);
    const size_t last = s->by_depth_count - 1;
    size_t k = 0;

    if (axis >= s->by_depth[last].depth) {
        kent_derivation_put(d, "z1", s->by_depth[last].depth, KENT_LENGTH, from,
                            "last depth of the soil's table");
        kent_derivation_put(d, name_of_stated(w), level_bearing(w), KENT_STRESS, from,
                            "allowable bearing there, and no more below it");
        return;
    }
    while (s->by_depth[k + 1].depth <= axis) {
        k++;
    }
    const kent_depth_row *row = &s->by_depth[k];
    kent_derivation_put(d, "z1", row[0].depth, KENT_LENGTH, from,
                        "row of the soil's table above the axis");
    kent_derivation_put(d, "q1", row[0].bearing, KENT_STRESS, from, "its bearing");
    kent_derivation_put(d, "z2", row[1].depth, KENT_LENGTH, from,
                        "row of the soil's table below the axis");
    kent_derivation_put(d, "q2", row[1].bearing, KENT_STRESS, from, "its bearing");
    kent_derivation_work(d, name_of_stated(w), level_bearing(w), KENT_STRESS,
                         "q1 + (q2 - q1)*(axis - z1)/(z2 - z1)", "10.21",
                         "allowable bearing at the axis");
}

static void derive_gradient(const kent_holding_work *w, kent_derivation *d)
{
    kent_derivation_put(d, "G", w->site.leans->bearing_gradient, KENT_UNIT_WEIGHT,
                        kent_soil_source(w->site.leans), "allowable bearing per depth");
    kent_derivation_work(d, name_of_stated(w), level_bearing(w), KENT_STRESS, "G*axis",
                         "10.22", "allowable bearing at the axis");
}

static void derive_slope(const kent_holding_work *w, kent_derivation *d)
{
    kent_derivation_put(d, "fall", w->site.falls, KENT_ANGLE, KENT_GIVEN,
                        "fall of the ground along the thrust");
}

/* The coefficient square to the face: Kh, or Kp by Rankine. */
static const char *derive_coefficient(const kent_holding_work *w, kent_derivation *d)
{
    const kent_soil *s = w->site.leans;
    const kent_source from = kent_soil_source(s);
    const kent_way way = kent_soil_way(s);
    const bool rubs = way == KENT_WAY_COULOMB, falls = w->site.falls > 0.0;
    const double value = kent_way_passive(s, way, w->site.falls);

    kent_derivation_put(d, "phi", s->friction_angle, KENT_ANGLE, from,
                        "friction angle of the soil");
    if (falls) derive_slope(w, d);
    if (rubs) {
        kent_derivation_put(d, "dw", s->wall_friction, KENT_ANGLE, from,
                            "friction angle of soil on the face");
    }
    if (s->cohesion > 0.0 || !(rubs || falls)) {
        kent_derivation_work(d, "Kp", kent_rankine_passive(s->friction_angle),
                             KENT_RATIO, "(1 + sin(phi))/(1 - sin(phi))", "10.18",
                             "passive coefficient by Rankine");
    }
    if (!rubs && !falls) return "Kp";
    kent_derivation_work(
        d, "Kh", value, KENT_RATIO,
        rubs ? (falls ? "(cos(phi)/(1 - sqrt(sin(phi + dw)*sin(phi - "
                        "fall)/(cos(dw)*cos(fall)))))^2"
                      : "(cos(phi)/(1 - sqrt(sin(phi + dw)*sin(phi)/cos(dw))))^2")
             : "(cos(phi)/(1 - sqrt(sin(phi)*sin(phi - fall)/cos(fall))))^2",
        "21.2", "passive coefficient by Coulomb, square to the face");
    return "Kh";
}

static void derive_passive(const kent_holding_work *w, kent_derivation *d)
{
    const kent_soil *s = w->site.leans;
    const kent_source from = kent_soil_source(s);
    const bool sticks = !(w->site.falls > 0.0);
    const bool plain = sticks && kent_soil_way(s) == KENT_WAY_RANKINE;
    const char *stress = derive_mean_stress(w, d);
    const char *k = derive_coefficient(w, d);
    char formula[64];

    if (sticks && (plain || s->cohesion > 0.0)) {
        kent_derivation_put(d, "c", s->cohesion, KENT_STRESS, from, "cohesion");
        (void)snprintf(formula, sizeof formula, "mp*(%s*%s + 2*c*sqrt(Kp))", k, stress);
    } else {
        (void)snprintf(formula, sizeof formula, "mp*%s*%s", k, stress);
    }
    kent_derivation_put(d, "mp", s->passive_share, KENT_RATIO, from,
                        "share of the passive pressure to count on");
    kent_derivation_work(d, "q", w->site.allowable, KENT_STRESS, formula,
                         plain ? "10.23" : "21.8", "allowable bearing at the axis");
}

/* What falling ground leaves of a stated bearing: q of qo. */
static void derive_falling(const kent_holding_work *w, kent_derivation *d)
{
    const kent_soil *s = w->site.leans;

    if (!(w->site.falls > 0.0)) return;
    kent_derivation_put(d, "phi", s->friction_angle, KENT_ANGLE, kent_soil_source(s),
                        "friction angle of the soil");
    derive_slope(w, d);
    kent_derivation_work(
        d, "Kf", kent_falling_passive(s->friction_angle, 0.0, w->site.falls),
        KENT_RATIO, "(cos(phi)/(1 - sqrt(sin(phi)*sin(phi - fall)/cos(fall))))^2",
        "21.2", "passive coefficient with that fall");
    kent_derivation_work(d, "q", w->site.allowable, KENT_STRESS,
                         "qo*Kf*(1 - sin(phi))/(1 + sin(phi))", "21.7",
                         "what the fall leaves of the bearing");
}

/* The passive coefficient that the bearing takes: Ki. */
static void derive_claim(const kent_holding_work *w, kent_derivation *d)
{
    const kent_soil *s = w->site.leans;
    const kent_bearing_place at = kent_site_place(&w->site, &w->m->rules);
    kent_bearing_claim claim;

    if (!kent_bearing_claims(s, &at, &claim)) return;
    const bool sticks = s->cohesion > 0.0, inside = s->factor_inside > 1.0;
    if (s->route != KENT_BEARING_PASSIVE) {
        derive_stress(w, claim.unit_weight,
                      claim.weight_assumed ? KENT_ASSUMED : kent_soil_source(s), d);
    }
    const bool said = s->route == KENT_BEARING_PASSIVE && !(w->site.falls > 0.0);
    if (sticks && !said) {
        kent_derivation_put(d, "c", s->cohesion, KENT_STRESS, kent_soil_source(s),
                            "cohesion");
    }
    if (inside) {
        kent_derivation_put(d, "fi", s->factor_inside, KENT_RATIO, kent_soil_source(s),
                            "factor already inside the soil's value");
    }
    kent_derivation_work(d, "Ki", claim.passive, KENT_RATIO,
                         sticks ? (inside ? "((sqrt(c^2 + sv*q*fi) - c)/sv)^2"
                                          : "((sqrt(c^2 + sv*q) - c)/sv)^2")
                                : (inside ? "q*fi/sv" : "q/sv"),
                         "10.24", "passive coefficient that this bearing takes");
}

/* What the soil's other ways would give, and what its own strength gives the face. */
static void derive_others(const kent_holding_work *w, const kent_bearing_view *view,
                          kent_derivation *d)
{
    static const char *const NAMES[KENT_BEARING_WAYS] = {"q_const", "q_table", "q_grad",
                                                         "q_rank", "q_coul"};
    char says[120];

    for (kent_way k = KENT_WAY_CONSTANT; k < KENT_BEARING_WAYS; k++) {
        const kent_bearing_way *way = &view->ways[k];
        if (!view->seen || !way->stated || way->decides || isnan(way->area)) continue;
        (void)snprintf(says, sizeof says, "%s, which does not decide: it asks for %s",
                       kent_way_word(k),
                       kent_said_of(KENT_AREA, w->m->units, way->area).s);
        kent_derivation_put(d, NAMES[k], way->bearing, KENT_STRESS, KENT_COMPUTED,
                            says);
    }
    if (!view->seen || isnan(view->passive)) return;
    kent_derivation_put(d, "P_p", view->passive, KENT_FORCE, KENT_COMPUTED,
                        "passive force on this face at failure, by Rankine (21.4)");
    kent_derivation_put(d, "P_a", view->active, KENT_FORCE, KENT_COMPUTED,
                        "active force behind it, not taken off here (21.5)");
}

void kent_bearing_derive(const kent_holding_work *w, const kent_holding *h,
                         kent_derivation *d)
{
    switch (w->site.leans->route) {
    case KENT_BEARING_CONSTANT:
        derive_constant(w, d);
        break;
    case KENT_BEARING_BY_DEPTH:
        derive_by_depth(w, d);
        break;
    case KENT_BEARING_GRADIENT:
        derive_gradient(w, d);
        break;
    case KENT_BEARING_PASSIVE:
        derive_passive(w, d);
        break;
    }
    if (w->site.leans->route != KENT_BEARING_PASSIVE) derive_falling(w, d);
    derive_claim(w, d);
    derive_others(w, &h->bearing, d);
}
