/* What the soil gives a face, in the hand calculation: by its route, and the passive
 * coefficient that this takes. */
#include "kent_holding_internal.h"

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

static void derive_constant(const kent_holding_work *w, kent_derivation *d)
{
    kent_derivation_put(d, "q", w->site.allowable, KENT_STRESS,
                        kent_soil_source(w->soil), "allowable bearing of the soil");
}

static void derive_by_depth(const kent_holding_work *w, kent_derivation *d)
{
    const kent_soil *s = w->soil;
    const kent_source from = kent_soil_source(s);
    const double axis = kent_site_axis(&w->site);
    const size_t last = s->by_depth_count - 1;
    size_t k = 0;

    if (axis >= s->by_depth[last].depth) {
        kent_derivation_put(d, "z1", s->by_depth[last].depth, KENT_LENGTH, from,
                            "last depth of the soil's table");
        kent_derivation_put(d, "q", w->site.allowable, KENT_STRESS, from,
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
    kent_derivation_work(d, "q", w->site.allowable, KENT_STRESS,
                         "q1 + (q2 - q1)*(axis - z1)/(z2 - z1)", "10.21",
                         "allowable bearing at the axis");
}

static void derive_gradient(const kent_holding_work *w, kent_derivation *d)
{
    kent_derivation_put(d, "G", w->soil->bearing_gradient, KENT_UNIT_WEIGHT,
                        kent_soil_source(w->soil), "allowable bearing per depth");
    kent_derivation_work(d, "q", w->site.allowable, KENT_STRESS, "G*axis", "10.22",
                         "allowable bearing at the axis");
}

static void derive_passive(const kent_holding_work *w, kent_derivation *d)
{
    const kent_soil *s = w->soil;
    const kent_source from = kent_soil_source(s);

    derive_stress(w, s->unit_weight, from, d);
    kent_derivation_put(d, "phi", s->friction_angle, KENT_ANGLE, from,
                        "friction angle of the soil");
    kent_derivation_put(d, "c", s->cohesion, KENT_STRESS, from, "cohesion");
    kent_derivation_work(d, "Kp", kent_rankine_passive(s->friction_angle), KENT_RATIO,
                         "(1 + sin(phi))/(1 - sin(phi))", "10.18",
                         "passive coefficient by Rankine");
    kent_derivation_put(d, "mp", s->passive_share, KENT_RATIO, from,
                        "share of the passive pressure to count on");
    kent_derivation_work(d, "q", w->site.allowable, KENT_STRESS,
                         "mp*(Kp*sv + 2*c*sqrt(Kp))", "10.23",
                         "allowable bearing at the axis");
}

/* The passive coefficient that the bearing takes: Ki. */
static void derive_claim(const kent_holding_work *w, kent_derivation *d)
{
    const kent_soil *s = w->soil;
    const kent_bearing_place at = kent_site_place(&w->site, &w->m->rules);
    kent_bearing_claim claim;

    if (!kent_bearing_claims(s, &at, &claim)) return;
    const bool sticks = s->cohesion > 0.0, inside = s->factor_inside > 1.0;
    if (s->route != KENT_BEARING_PASSIVE) {
        derive_stress(w, claim.unit_weight,
                      claim.weight_assumed ? KENT_ASSUMED : kent_soil_source(s), d);
        if (sticks) {
            kent_derivation_put(d, "c", s->cohesion, KENT_STRESS, kent_soil_source(s),
                                "cohesion");
        }
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

void kent_bearing_derive(const kent_holding_work *w, kent_derivation *d)
{
    switch (w->soil->route) {
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
    derive_claim(w, d);
}
