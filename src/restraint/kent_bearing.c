#include "kent_bearing.h"
#include "kent_restraint.h"

#include <assert.h>
#include <math.h>

/* source docs/theory/10-blocks.md, 10.20 */
double kent_effective_stress(double unit_weight, const kent_bearing_place *at)
{
    const double under = fmax(0.0, at->depth - at->water_table);
    return unit_weight * at->depth - at->water * under;
}

/* source docs/theory/10-blocks.md, 10.21 */
static double bearing_by_depth(const kent_soil *soil, double depth,
                               kent_bearing_gap *gap)
{
    const kent_depth_row *row = soil->by_depth;
    assert(soil->by_depth_count > 0);
    const size_t last = soil->by_depth_count - 1;
    size_t k = 0;

    if (depth < row[0].depth) {
        *gap = KENT_BEARING_ABOVE_TABLE;
        return NAN;
    }
    if (depth >= row[last].depth) return row[last].bearing;
    while (row[k + 1].depth <= depth) {
        k++;
    }
    const double share = (depth - row[k].depth) / (row[k + 1].depth - row[k].depth);
    return row[k].bearing + share * (row[k + 1].bearing - row[k].bearing);
}

/* source docs/theory/10-blocks.md, 10.23 */
static double bearing_passive(const kent_soil *soil, const kent_bearing_place *at,
                              kent_bearing_gap *gap)
{
    const double stress = kent_effective_stress(soil->unit_weight, at);
    const double pressure =
        kent_passive_pressure(soil->friction_angle, soil->cohesion, stress);

    if (isnan(pressure)) *gap = KENT_BEARING_LACKS;
    return soil->passive_share * pressure;
}

double kent_soil_bearing(const kent_soil *soil, const kent_bearing_place *at,
                         kent_bearing_gap *gap)
{
    *gap = KENT_BEARING_KNOWN;
    if (soil->route == KENT_BEARING_CONSTANT) return soil->allowable_bearing;
    if (isnan(at->depth)) {
        *gap = KENT_BEARING_NO_DEPTH;
        return NAN;
    }
    switch (soil->route) {
    case KENT_BEARING_CONSTANT:
        break;
    case KENT_BEARING_BY_DEPTH:
        return bearing_by_depth(soil, at->depth, gap);
    case KENT_BEARING_GRADIENT:
        return soil->bearing_gradient * at->depth; /* 10.22 */
    case KENT_BEARING_PASSIVE:
        return bearing_passive(soil, at, gap);
    }
    return soil->allowable_bearing;
}

/* source docs/theory/10-blocks.md, 10.24 */
double kent_implied_passive(double bearing, double cohesion, double stress)
{
    const double c = isnan(cohesion) ? 0.0 : cohesion;
    const double root = (sqrt(c * c + stress * bearing) - c) / stress;
    return root * root;
}

bool kent_bearing_claims(const kent_soil *soil, const kent_bearing_place *at,
                         kent_bearing_claim *out)
{
    kent_bearing_gap gap = KENT_BEARING_KNOWN;
    const double bearing = kent_soil_bearing(soil, at, &gap) * soil->factor_inside;
    const bool assumed = isnan(soil->unit_weight);
    const double weight = assumed ? KENT_UNIT_WEIGHT_ASSUMED : soil->unit_weight;
    const double stress = kent_effective_stress(weight, at);

    if (!(bearing > 0.0) || !(stress > 0.0)) return false; /* NaN: not known */
    *out = (kent_bearing_claim){
        .bearing = bearing,
        .unit_weight = weight,
        .stress = stress,
        .passive = kent_implied_passive(bearing, soil->cohesion, stress),
        .weight_assumed = assumed,
    };
    return true;
}
