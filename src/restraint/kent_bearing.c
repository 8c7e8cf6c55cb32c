#include "kent_bearing.h"
#include "kent_earth.h"
#include "kent_restraint.h"

#include <assert.h>
#include <math.h>

/* source docs/theory/10-blocks.md, 10.20 */
double kent_effective_stress(double unit_weight, const kent_bearing_place *at)
{
    const double under = fmax(0.0, at->depth - at->water_table);
    return unit_weight * at->depth - at->water * under;
}

/* source docs/theory/21-ground.md, 21.6 */
double kent_mean_stress(double unit_weight, const kent_bearing_place *at)
{
    return kent_effective_stress(unit_weight, at) -
           at->water * kent_face_cut(at->depth, at->face, at->water_table);
}

/* ---- each way -------------------------------------------------------------------- */

kent_way kent_soil_way(const kent_soil *soil)
{
    switch (soil->route) {
    case KENT_BEARING_CONSTANT:
        break;
    case KENT_BEARING_BY_DEPTH:
        return KENT_WAY_BY_DEPTH;
    case KENT_BEARING_GRADIENT:
        return KENT_WAY_GRADIENT;
    case KENT_BEARING_PASSIVE:
        return isnan(soil->wall_friction) ? KENT_WAY_RANKINE : KENT_WAY_COULOMB;
    }
    return KENT_WAY_CONSTANT;
}

bool kent_soil_states(const kent_soil *soil, kent_way way)
{
    switch (way) {
    case KENT_WAY_CONSTANT:
        return !isnan(soil->allowable_bearing);
    case KENT_WAY_BY_DEPTH:
        return soil->by_depth_count > 0;
    case KENT_WAY_GRADIENT:
        return !isnan(soil->bearing_gradient);
    case KENT_WAY_RANKINE:
        return !isnan(soil->passive_share);
    case KENT_WAY_COULOMB:
        return !isnan(soil->passive_share) && !isnan(soil->wall_friction);
    case KENT_BEARING_WAYS:
        break;
    }
    return false;
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

double kent_way_passive(const kent_soil *soil, kent_way way, double falls)
{
    const double rubs = way == KENT_WAY_COULOMB ? soil->wall_friction : 0.0;
    if (way == KENT_WAY_RANKINE && !(falls > 0.0)) {
        return kent_rankine_passive(soil->friction_angle);
    }
    return kent_falling_passive(soil->friction_angle, rubs, fmax(0.0, falls));
}

/* Cohesion counts by Rankine whatever rubs on the face, and not at all before ground
 * that falls. source docs/theory/10-blocks.md, 10.23; 21-ground.md, 21.8 */
static double bearing_passive(const kent_soil *soil, kent_way way,
                              const kent_bearing_place *at, kent_bearing_gap *gap)
{
    const double stress = kent_mean_stress(soil->unit_weight, at);
    const double sticks =
        2.0 * soil->cohesion * sqrt(kent_rankine_passive(soil->friction_angle));
    const double coefficient = kent_way_passive(soil, way, at->falls);

    if (isnan(stress) || isnan(sticks)) {
        *gap = KENT_BEARING_LACKS;
        return NAN;
    }
    if (isnan(coefficient)) {
        const bool falls = isnan(kent_way_passive(soil, KENT_WAY_RANKINE, at->falls));
        *gap = falls ? KENT_BEARING_FALLS : KENT_BEARING_NO_PLANE;
        return NAN;
    }
    return soil->passive_share *
           (coefficient * stress + (at->falls > 0.0 ? 0.0 : sticks));
}

/* source docs/theory/21-ground.md, 21.7 */
double kent_falling_share(const kent_soil *soil, double falls)
{
    if (!(falls > 0.0)) return 1.0;
    return kent_falling_passive(soil->friction_angle, 0.0, falls) /
           kent_rankine_passive(soil->friction_angle);
}

static double bearing_stated(const kent_soil *soil, kent_way way,
                             const kent_bearing_place *at, kent_bearing_gap *gap)
{
    switch (way) {
    case KENT_WAY_CONSTANT:
        break;
    case KENT_WAY_BY_DEPTH:
        return bearing_by_depth(soil, at->depth, gap);
    case KENT_WAY_GRADIENT:
        return soil->bearing_gradient * at->depth; /* 10.22 */
    case KENT_WAY_RANKINE:
    case KENT_WAY_COULOMB:
    case KENT_BEARING_WAYS:
        return bearing_passive(soil, way, at, gap);
    }
    return soil->allowable_bearing;
}

double kent_way_bearing(const kent_soil *soil, kent_way way,
                        const kent_bearing_place *at, kent_bearing_gap *gap)
{
    const bool passive = way == KENT_WAY_RANKINE || way == KENT_WAY_COULOMB;

    *gap = KENT_BEARING_KNOWN;
    if (way != KENT_WAY_CONSTANT && isnan(at->depth)) {
        *gap = KENT_BEARING_NO_DEPTH;
        return NAN;
    }
    const double bearing = bearing_stated(soil, way, at, gap);
    if (passive || !(bearing > 0.0)) return bearing;
    const double share = kent_falling_share(soil, at->falls);
    if (isnan(share)) *gap = KENT_BEARING_FALLS;
    return share * bearing;
}

double kent_soil_bearing(const kent_soil *soil, const kent_bearing_place *at,
                         kent_bearing_gap *gap)
{
    return kent_way_bearing(soil, kent_soil_way(soil), at, gap);
}

/* ---- what a bearing claims ------------------------------------------------------- */

/* source docs/theory/10-blocks.md, 10.24 */
double kent_implied_passive(double bearing, double cohesion, double stress)
{
    const double c = isnan(cohesion) ? 0.0 : cohesion;
    const double root = (sqrt(c * c + stress * bearing) - c) / stress;
    return root * root;
}

bool kent_bearing_claims_of(const kent_soil *soil, double bearing,
                            const kent_bearing_place *at, kent_bearing_claim *out)
{
    const double whole = bearing * soil->factor_inside;
    const bool assumed = isnan(soil->unit_weight);
    const double weight = assumed ? KENT_UNIT_WEIGHT_ASSUMED : soil->unit_weight;
    const double stress = kent_effective_stress(weight, at);

    if (!(whole > 0.0) || !(stress > 0.0)) return false; /* NaN: not known */
    *out = (kent_bearing_claim){
        .bearing = whole,
        .unit_weight = weight,
        .stress = stress,
        .passive = kent_implied_passive(whole, soil->cohesion, stress),
        .weight_assumed = assumed,
    };
    return true;
}

bool kent_bearing_claims(const kent_soil *soil, const kent_bearing_place *at,
                         kent_bearing_claim *out)
{
    kent_bearing_gap gap = KENT_BEARING_KNOWN;
    return kent_bearing_claims_of(soil, kent_soil_bearing(soil, at, &gap), at, out);
}
