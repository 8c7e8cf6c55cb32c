/* Sets of design rules, and what a case has in place of a set's values. */
#include "kent_catalogue_internal.h"

#include <math.h>
#include <stddef.h>
#include <stdio.h>
#include <string.h>

/* Numbers by key; those that a set cannot do without are marked. */
static const struct {
    const char *key;
    size_t at; /* offset within kent_rules */
    bool needed;
} NUMBERS[] = {
    {"safety_factor", offsetof(kent_rules, safety_factor), true},
    {"factor_test", offsetof(kent_rules, factor_test), false},
    {"height_to_depth", offsetof(kent_rules, height_to_depth), true},
    {"width_to_height_least", offsetof(kent_rules, width_to_height), true},
    {"width_to_height_most", offsetof(kent_rules, width_to_height) + sizeof(double),
     true},
    {"least_thickness", offsetof(kent_rules, least_thickness), true},
    {"least_height", offsetof(kent_rules, least_height), true},
    {"side_step", offsetof(kent_rules, side_step), true},
    {"least_cover", offsetof(kent_rules, least_cover), true},
    {"concrete_unit_weight", offsetof(kent_rules, concrete_unit_weight), true},
    {"water_unit_weight", offsetof(kent_rules, water_unit_weight), true},
    {"wrapped_ratio", offsetof(kent_rules, wrapped_ratio), true},
    {"largest_volume", offsetof(kent_rules, largest_volume), true},
    {"largest_thrust", offsetof(kent_rules, largest_thrust), false},
    {"height_over_diameter", offsetof(kent_rules, height_over_diameter), false},
    {"concrete_behind", offsetof(kent_rules, concrete_behind), false},
    {"large_diameter", offsetof(kent_rules, large_diameter), false},
    {"large_least_cover", offsetof(kent_rules, large_least_cover), false},
    {"steepest_ground", offsetof(kent_rules, steepest_ground), false},
    {"steepest_pipe", offsetof(kent_rules, steepest_pipe), false},
    {"strength_before_test", offsetof(kent_rules, strength_before_test), false},
    {"least_age", offsetof(kent_rules, least_age), false},
    {"factor_sliding", offsetof(kent_rules, factor_sliding), false},
    {"factor_overturning", offsetof(kent_rules, factor_overturning), false},
    {"factor_flotation", offsetof(kent_rules, factor_flotation), false},
    {"factor_stability_test", offsetof(kent_rules, factor_stability_test), false},
    {"strap_stress", offsetof(kent_rules, strap_stress), false},
    {"strap_bond", offsetof(kent_rules, strap_bond), false},
    {"strap_diameter", offsetof(kent_rules, strap_diameter), false},
    {"run_share", offsetof(kent_rules, run_share), false},
};

enum { NUMBER_COUNT = sizeof NUMBERS / sizeof NUMBERS[0] };

void kent_record_rules(const kent_record *record, kent_rules *rules)
{
    for (size_t i = 0; i < NUMBER_COUNT; i++) {
        if (!kent_record_has(record, NUMBERS[i].key)) continue;
        const double value = kent_record_number(record, NUMBERS[i].key);
        memcpy((char *)rules + NUMBERS[i].at, &value, sizeof value);
    }
    const int blocks = kent_record_field(record, "blocks")->index;
    const int vertical = kent_record_field(record, "vertical_blocks")->index;
    const int spread = kent_record_field(record, "spread")->index;
    const int code = kent_record_field(record, "concrete_code")->index;
    const int form = kent_record_field(record, "length_form")->index;
    if (blocks >= 0) rules->blocks = (kent_block_policy)blocks;
    if (vertical >= 0) rules->vertical_blocks = (kent_block_policy)vertical;
    if (spread >= 0) rules->spread = (kent_spread)spread;
    if (code >= 0) rules->concrete_code = (kent_concrete_code)code;
    if (form >= 0) rules->length_form = (kent_length_form)form;
    rules->soil_above = kent_record_switch(record, "soil_above", rules->soil_above);
}

/* Factors are either not asked or at least 1, a large cover needs its diameter. */
void kent_record_rules_check(kent_reader *r, kent_record *record,
                             const kent_rules *rules)
{
    static const char *const FACTORS[] = {"factor_sliding", "factor_overturning",
                                          "factor_flotation", "factor_stability_test"};
    for (size_t i = 0; i < sizeof FACTORS / sizeof FACTORS[0]; i++) {
        const double factor = kent_record_number_or(record, FACTORS[i], 0.0);
        if (factor > 0.0 && factor < 1.0) {
            kent_record_complain(r, record, FACTORS[i],
                                 "%s = %g asks for less than balance; give 1.0 or "
                                 "more, or 0.0 where it is not asked",
                                 FACTORS[i], factor);
        }
    }
    if (!record->sound) return;
    if (rules->width_to_height[0] > rules->width_to_height[1]) {
        kent_record_complain(r, record, NULL,
                             "width_to_height_least is above width_to_height_most");
    } else if ((rules->large_diameter > 0.0) != (rules->large_least_cover > 0.0)) {
        kent_record_complain(r, record, NULL,
                             "large_diameter and large_least_cover belong together: "
                             "the cover asked from that outside diameter on; give "
                             "both, or 0 for both");
    } else if (rules->large_least_cover > 0.0 &&
               rules->large_least_cover < rules->least_cover) {
        kent_record_complain(r, record, NULL,
                             "large_least_cover is below least_cover; a large pipe "
                             "needs at least as much");
    }
}

/* Copies the set that another is based on; what is said of soils is its own. */
static bool begin_with(kent_reader *r, kent_record *record, const kent_catalogue *c,
                       kent_rules *rules)
{
    char base[KENT_ID];
    kent_record_copy(record, "based_on", NULL, base, sizeof base);
    for (size_t i = 0; i < c->rule_count && base[0] != '\0'; i++) {
        if (strcmp(c->rules[i].id, base) != 0) continue;
        *rules = c->rules[i];
        rules->soils[0] = '\0';
        return true;
    }
    if (base[0] != '\0') {
        kent_record_complain(r, record, "based_on",
                             "based_on: there is no set \"%s\" above this one", base);
        return true; /* nothing more to say of what is missing */
    }
    return false;
}

void kent_catalogue_add_rules(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    kent_rules rules = {.factor_test = NAN};
    const bool based = begin_with(r, record, c, &rules);
    for (size_t i = 0; i < NUMBER_COUNT; i++) {
        if (based || !NUMBERS[i].needed || kent_record_has(record, NUMBERS[i].key)) {
            continue;
        }
        kent_record_complain(r, record, NULL,
                             "'%s' is missing; give it, or based_on, the id of a set "
                             "that has it",
                             NUMBERS[i].key);
        break; /* once told, the others are found by their like */
    }
    const kent_provenance from = kent_record_provenance(record);
    kent_record_copy(record, "id", NULL, rules.id, sizeof rules.id);
    if (kent_record_has(record, "soils")) {
        kent_record_copy(record, "soils", NULL, rules.soils, sizeof rules.soils);
    }
    (void)snprintf(rules.source, sizeof rules.source, "%.160s (%s)", from.source,
                   from.status);
    kent_record_rules(record, &rules);
    kent_record_rules_check(r, record, &rules);
    if (!record->sound) return;
    kent_rules *row =
        kent_catalogue_grown(r, (void **)&c->rules, &c->rule_count, sizeof *row);
    if (row) *row = rules;
}
