#include "kent_told_rules.h"

#include <math.h>

/* ---- shape ----------------------------------------------------------------------- */

static void add(kent_text *out, const char *before, kent_kind kind, kent_system units,
                double si)
{
    kent_text_add(out, "; %s %s", before, kent_shown_with_unit(kind, units, si).text);
}

void kent_told_shape(const kent_rules *r, kent_system units, kent_text *out)
{
    kent_text_add(out, "safety factor %.2f", r->safety_factor);
    if (r->soils[0] != '\0') {
        kent_text_add(out, " on bearings of the soils %s alone", r->soils);
    }
    if (!isnan(r->factor_test)) {
        kent_text_add(out, ", under test %.2f", r->factor_test);
    }
    kent_text_add(out, "; height at most %.2f of the depth of its base",
                  r->height_to_depth);
    kent_text_add(out, "; width %.2f to %.2f heights", r->width_to_height[0],
                  r->width_to_height[1]);
    add(out, "thickness from", KENT_LENGTH, units, r->least_thickness);
    add(out, "height from", KENT_LENGTH, units, r->least_height);
    add(out, "sides in steps of", KENT_LENGTH, units, r->side_step);
    add(out, "no block under less cover than", KENT_LENGTH, units, r->least_cover);
    add(out, "concrete", KENT_UNIT_WEIGHT, units, r->concrete_unit_weight);
    add(out, "ground water", KENT_UNIT_WEIGHT, units, r->water_unit_weight);
    kent_text_add(out, "; friction of a sleeved pipe %.2f of a bare one's",
                  r->wrapped_ratio);
    add(out, "one block at most", KENT_VOLUME, units, r->largest_volume);
}

/* ---- what is asked --------------------------------------------------------------- */

static const char *policy(kent_block_policy blocks)
{
    switch (blocks) {
    case KENT_BLOCKS_ALLOWED:
        return "allowed";
    case KENT_BLOCKS_FORBIDDEN:
        return "forbidden";
    case KENT_BLOCKS_ON_OLD_MAINS:
        return "only where a new main joins an old one";
    case KENT_BLOCKS_WITH_JOINTS:
        return "only together with restrained joints, each for all";
    }
    return "";
}

static void add_policies(const kent_rules *r, kent_text *out)
{
    if (r->blocks != KENT_BLOCKS_ALLOWED) {
        kent_text_add(out, "; blocks %s", policy(r->blocks));
    }
    if (r->vertical_blocks != KENT_BLOCKS_ALLOWED && r->vertical_blocks != r->blocks) {
        kent_text_add(out, "; blocks under an upward thrust %s",
                      policy(r->vertical_blocks));
    }
}

static void add_limits(const kent_rules *r, kent_system units, kent_text *out)
{
    const struct {
        double value;
        kent_kind kind;
        const char *before;
    } limits[] = {
        {r->largest_thrust, KENT_FORCE, "the concrete itself to be designed beyond"},
        {r->height_over_diameter, KENT_LENGTH, "a block taller than the pipe by"},
        {r->concrete_behind, KENT_LENGTH, "concrete behind a fitting from"},
        {r->large_least_cover, KENT_LENGTH, "cover from"},
        {r->large_diameter, KENT_DIAMETER,
         "that of pipes with an outside diameter from"},
        {r->steepest_ground, KENT_ANGLE, "no block where ground falls more than"},
        {r->strength_before_test, KENT_STRENGTH, "concrete before the test"},
    };
    for (size_t i = 0; i < sizeof limits / sizeof limits[0]; i++) {
        if (limits[i].value > 0.0) {
            add(out, limits[i].before, limits[i].kind, units, limits[i].value);
        }
    }
    if (r->least_age > 0.0) {
        kent_text_add(out, "; %.3g days old at the test", r->least_age / 86400.0);
    }
    if (r->steepest_pipe > 0.0) {
        kent_text_add(out, "; anchors on mains steeper than %.3f", r->steepest_pipe);
    }
}

static void add_factors(const kent_rules *r, kent_text *out)
{
    const struct {
        double value;
        const char *name;
    } factors[] = {{r->factor_sliding, "sliding"},
                   {r->factor_overturning, "overturning"},
                   {r->factor_flotation, "floating"}};
    for (size_t i = 0; i < sizeof factors / sizeof factors[0]; i++) {
        if (!(factors[i].value > 0.0)) continue;
        kent_text_add(out, "; factor against %s %.2f", factors[i].name,
                      factors[i].value);
    }
    if (r->factor_stability_test > 0.0) {
        kent_text_add(out, "; %.2f against sliding and overturning under test",
                      r->factor_stability_test);
    }
}

static void add_straps(const kent_rules *r, kent_system units, kent_text *out)
{
    if (r->strap_stress > 0.0) {
        add(out, "straps pulled to", KENT_STRENGTH, units, r->strap_stress);
    }
    if (r->strap_bond > 0.0) {
        add(out, "their bond to concrete", KENT_STRENGTH, units, r->strap_bond);
    }
    if (r->strap_diameter > 0.0) {
        add(out, "their diameter from", KENT_DIAMETER, units, r->strap_diameter);
    }
}

void kent_told_asked(const kent_rules *r, kent_system units, kent_text *out)
{
    add_policies(r, out);
    add_limits(r, units, out);
    add_factors(r, out);
    kent_text_add(out, "; soil above a gravity block %s as weight",
                  r->soil_above ? "counts" : "does not count");
    add_straps(r, units, out);
    kent_text_add(out, "; thrust spreads in concrete %s",
                  r->spread == KENT_SPREAD_45 ? "within 45 degrees"
                                              : "as far as it bears plain");
    kent_text_add(out, "; concrete by %s",
                  r->concrete_code == KENT_EN_1992 ? "EN 1992" : "ACI 318");
    kent_text_add(out, "; restrained lengths by %s",
                  r->length_form == KENT_FORM_HANDBOOK ? "the handbooks' form"
                                                       : "ETL 1110-3-446");
    if (r->run_share > 0.0) {
        kent_text_add(out, "; %.2f of the bearing of a tee's run counts", r->run_share);
    }
}
