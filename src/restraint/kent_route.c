/* Every way that a face's soil states, worked out at its depth. */
#include "kent_earth.h"
#include "kent_holding_internal.h"

const char *kent_way_word(kent_way way)
{
    switch (way) {
    case KENT_WAY_CONSTANT:
        return "presumptive";
    case KENT_WAY_BY_DEPTH:
        return "by depth";
    case KENT_WAY_GRADIENT:
        return "per depth";
    case KENT_WAY_RANKINE:
        return "passive (Rankine)";
    case KENT_WAY_COULOMB:
        return "passive (Coulomb)";
    case KENT_BEARING_WAYS:
        break;
    }
    return "";
}

/* N on the face that was sized, at failure by the soil's own strength. */
static void route_limits(const kent_holding_work *w, kent_holding *h,
                         const kent_soil *soil)
{
    const kent_block *b = &h->block;
    const double axis = kent_site_axis(&w->site);
    const double top = fmax(0.0, axis - 0.5 * b->face.height);
    const double base = axis + 0.5 * b->face.height;
    const kent_earth earth = {soil->unit_weight, soil->friction_angle, soil->cohesion,
                              w->site.water_table, w->m->rules.water_unit_weight};
    const bool known =
        !isnan(soil->unit_weight + soil->friction_angle + soil->cohesion);

    if (!known || !(b->face.width > 0.0) || w->site.falls > 0.0) return;
    h->bearing.passive = b->face.width * kent_face_passive(&earth, top, base);
    h->bearing.active = b->face.width * kent_face_active(&earth, top, base);
}

void kent_holding_routes(kent_holding_work *w, kent_holding *h)
{
    const kent_bearing_place at = kent_site_place(&w->site, &w->m->rules);
    const kent_soil *soil = w->site.leans;
    kent_bearing_view *view = &h->bearing;

    if (!kent_soil_counts(soil) || !(w->demand.load[KENT_SIDEWAYS] > 0.0)) return;
    *view = (kent_bearing_view){
        .seen = true,
        .on_fill = soil != w->soil,
        .depth = at.depth,
        .water_table = at.water_table,
        .stress = kent_effective_stress(soil->unit_weight, &at),
        .cohesion = soil->cohesion,
        .factor_inside = soil->factor_inside,
        .falls = at.falls,
        .passive = NAN,
        .active = NAN,
    };
    for (kent_way k = KENT_WAY_CONSTANT; k < KENT_BEARING_WAYS; k++) {
        kent_bearing_way *way = &view->ways[k];
        kent_bearing_claim claim;
        kent_soil own = *soil; /* the factor inside is that of what decides */
        *way = (kent_bearing_way){.bearing = NAN, .area = NAN, .passive = NAN};
        way->stated = kent_soil_states(soil, k);
        if (!way->stated) continue;
        way->decides = k == kent_soil_way(soil);
        way->bearing = kent_way_bearing(soil, k, &at, &way->gap);
        if (!(way->bearing > 0.0)) continue;
        way->area = w->demand.load[KENT_SIDEWAYS] / way->bearing;
        own.factor_inside = way->decides ? soil->factor_inside : 1.0;
        if (kent_bearing_claims_of(&own, way->bearing, &at, &claim)) {
            way->passive = claim.passive;
        }
    }
    route_limits(w, h, soil);
}
