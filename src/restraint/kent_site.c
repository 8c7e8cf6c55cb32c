/* The ground that a block stands in: depths, and what it may bear there. */
#include "kent_block_internal.h"

/* source docs/theory/10-blocks.md, 10.1 */
double kent_site_axis(const kent_site *site)
{
    return site->cover + 0.5 * site->diameter;
}

kent_bearing_place kent_site_place(const kent_site *site, const kent_rules *rules)
{
    const double axis = kent_site_axis(site);
    return (kent_bearing_place){
        .depth = axis,
        .water_table = site->water_table,
        .water = rules->water_unit_weight,
        .falls = site->falls,
        .face = isnan(axis) ? 0.0 : kent_face_height_limit(rules, axis),
    };
}

double kent_rules_cover(const kent_rules *rules, double diameter)
{
    const bool large = rules->large_diameter > 0.0 && diameter >= rules->large_diameter;
    return large ? fmax(rules->least_cover, rules->large_least_cover)
                 : rules->least_cover;
}

/* source docs/theory/10-blocks.md, 10.34 */
double kent_rules_height(const kent_rules *rules, double diameter)
{
    const double over = rules->height_over_diameter;
    return over > 0.0 ? fmax(rules->least_height, diameter + over)
                      : rules->least_height;
}

void kent_site_bear(kent_site *site, const kent_rules *rules)
{
    const kent_bearing_place at = kent_site_place(site, rules);
    const kent_soil *soil = site->soil;

    site->allowable = NAN;
    site->vertical = NAN;
    site->gap = KENT_BEARING_KNOWN;
    site->leans = soil;
    if (!soil) return;
    site->allowable = kent_soil_bearing(soil, &at, &site->gap);
    site->vertical = soil->vertical_bearing;
    if (isnan(site->vertical) && soil->route == KENT_BEARING_CONSTANT) {
        site->vertical = soil->allowable_bearing;
    }
    if (!site->fill || isnan(site->allowable)) return;

    kent_bearing_gap gap = KENT_BEARING_KNOWN;
    const double fill = kent_soil_bearing(site->fill, &at, &gap);
    if (fill >= site->allowable) return; /* the ground is the weaker */
    site->allowable = fill;
    site->gap = gap;
    site->leans = site->fill;
}

/* source docs/theory/10-blocks.md, 10.12. A depth that is not known (NAN) counts as
 * under water where there is any. */
double kent_site_concrete(const kent_site *site, const kent_rules *rules, double depth)
{
    const bool dry = isinf(site->water_table) || depth <= site->water_table;
    return rules->concrete_unit_weight - (dry ? 0.0 : rules->water_unit_weight);
}
