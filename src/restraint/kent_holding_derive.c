/* The hand calculation of one fitting, from its thrust to what holds it. */
#include "kent_concrete_internal.h"

#include <stdio.h>
#include <string.h>

static const struct sense_words {
    const char *part, *formula, *lasting, *factored, *formula_factored, *says;
} SENSES[KENT_SENSES] = {
    [KENT_RESULTANT] = {"T", "sqrt(T_x^2+T_y^2+T_z^2)",
                        "sqrt((T_x-U_x)^2+(T_y-U_y)^2+(T_z-U_z)^2)", "F", "SF*T",
                        "whole thrust"},
    [KENT_SIDEWAYS] = {"T_h", "sqrt(T_x^2+T_y^2)", "sqrt((T_x-U_x)^2+(T_y-U_y)^2)",
                       "Fh", "SF*T_h", "sideways thrust"},
    [KENT_UPWARD] = {"T_up", "T_z", "T_z-U_z", "Fup", "SF*T_up", "upward thrust"},
    [KENT_DOWNWARD] = {"T_dn", "-T_z", "-(T_z-U_z)", "Fdn", "SF*T_dn",
                       "downward thrust"},
};

/* A soil of the case's own has a line there, whatever report it names as its source. */
kent_source kent_soil_source(const kent_soil *soil)
{
    const bool own = soil->place.line > 0 || strncmp(soil->source, "given", 5) == 0;
    return own ? KENT_GIVEN : KENT_CATALOGUE;
}

kent_source kent_factor_source(const kent_model *m, const kent_load_case *c)
{
    return isnan(m->loads.factor[c->kind]) ? KENT_CATALOGUE : KENT_GIVEN;
}

const char *kent_factor_says(const kent_model *m, const kent_load_case *c)
{
    const bool rules = c->kind == KENT_CASE_TEST && isnan(m->loads.factor[c->kind]) &&
                       !isnan(m->rules.factor_test);
    return rules ? "factor of the design rules for the site test"
                 : "factor of this load case";
}

/* Whether the sum of the momentum table that stands above is this thrust. */
static bool derivation_has(const kent_derivation *d, kent_vec3 thrust)
{
    const kent_line *x = kent_derivation_find(d, "T_x");
    const kent_line *y = kent_derivation_find(d, "T_y");
    const kent_line *z = kent_derivation_find(d, "T_z");
    const double near = 1e-9 * kent_vec3_length(thrust);

    return x && y && z && fabs(x->value - thrust.x) <= near &&
           fabs(y->value - thrust.y) <= near && fabs(z->value - thrust.z) <= near;
}

/* Of a load, what the block takes where restrained joints take the rest. */
static double share_of(const kent_holding *h, kent_sense sense)
{
    return sense != KENT_RESULTANT && h->block_share < 1.0 ? h->block_share : 1.0;
}

/* The load with its factor, the block's share of it, and what soil may bear more. */
static void derive_factored(kent_holding *h, kent_sense sense, const kent_load_case *c)
{
    kent_derivation *d = &h->derivation;
    const double share = share_of(h, sense);
    const bool shared = share < 1.0;
    const bool more =
        c->increase != 1.0 && (sense == KENT_SIDEWAYS || sense == KENT_DOWNWARD);
    const double load = kent_holding_load(c, sense);
    char formula[48];

    if (shared) {
        kent_derivation_put(d, "bs", h->block_share, KENT_RATIO, KENT_GIVEN,
                            "part of the thrust that the block is for");
    }
    if (more) {
        kent_derivation_put(d, "k", c->increase, KENT_RATIO, KENT_GIVEN,
                            "soil may bear so many times as much in this case (9.18)");
    }
    (void)snprintf(formula, sizeof formula, "%s%s%s", shared ? "bs*" : "",
                   SENSES[sense].formula_factored, more ? "/k" : "");
    kent_derivation_work(d, SENSES[sense].factored, share * load, KENT_FORCE, formula,
                         shared ? "21.10"
                         : more ? "9.18"
                                : "10.11",
                         shared ? "factored load on the block" : "factored load");
}

/* A thrust of one sense and its factored load (09 gives the thrust itself). */
static void derive_load(const kent_holding_work *w, kent_holding *h, kent_sense sense)
{
    kent_derivation *d = &h->derivation;
    const struct sense_words *word = &SENSES[sense];
    const kent_load_case *c = &w->loads->cases[h->by_sense[sense]];
    const kent_balance *b = &c->worst[sense].balance;
    const double part = kent_holding_part(c, sense);
    const bool changing = kent_vec3_length(b->unsteady) > 0.0;
    char says[160];

    (void)snprintf(says, sizeof says, "Factored load: %s, case '%s'", word->says,
                   c->title.s);
    kent_derivation_heading(d, says);
    if (derivation_has(d, b->thrust)) {
        (void)snprintf(says, sizeof says, "%s%s", word->says,
                       changing ? ", without the force of the changing flow" : "");
        kent_derivation_work(d, word->part, part, KENT_FORCE,
                             changing ? word->lasting : word->formula, "8.8", says);
    } else {
        kent_derivation_put(d, word->part, part, KENT_FORCE, KENT_COMPUTED, word->says);
    }
    kent_derivation_put(d, "SF", c->safety_factor, KENT_RATIO,
                        kent_factor_source(w->m, c), kent_factor_says(w->m, c));
    derive_factored(h, sense, c);
    if (sense != h->sense || h->runner_up < 0) return;
    (void)snprintf(says, sizeof says, "the next case, '%s', asks for less",
                   w->loads->cases[h->runner_up].title.s);
    kent_derivation_put(d, "Fnext", share_of(h, sense) * h->runner_up_load, KENT_FORCE,
                        KENT_COMPUTED, says);
}

static void derive_peak(const kent_holding_work *w, kent_holding *h)
{
    const kent_load_case *c = &w->loads->cases[h->governing];
    const kent_instant *at = &c->worst[h->sense];

    if (c->scenario < 0) return;
    kent_derivation_put(&h->derivation, "tpk", at->time, KENT_TIME, KENT_COMPUTED,
                        "instant of this peak");
    if (isnan(c->above_90_percent)) return; /* of a peak on one side of a shut valve */
    kent_derivation_put(&h->derivation, "t90", c->above_90_percent, KENT_TIME,
                        KENT_COMPUTED, "stays above 90 % of its peak for");
}

void kent_holding_derive(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const bool turns = h->unbalanced && w->loads->count > 0;

    if (h->governing < 0 && turns) {
        kent_loads_derive(w->m, w->fitting, &w->loads->cases[w->couple.governing],
                          KENT_RESULTANT, d);
        return;
    }
    if (h->governing < 0) {
        kent_derivation_heading(d, "No load case pushes on this fitting");
        return;
    }
    kent_loads_derive(w->m, w->fitting, &w->loads->cases[h->governing], h->sense, d);
    derive_peak(w, h);
    derive_load(w, h, h->sense); /* first of all what governs */
    if (h->needs_nothing || h->unbalanced) return;
    for (kent_sense s = KENT_SIDEWAYS; s < KENT_SENSES; s++) {
        const bool counts = h->block.type != KENT_BLOCK_NONE && w->demand.load[s] > 0.0;
        if (counts && s != h->sense) derive_load(w, h, s);
    }
    kent_block_derive(w, h);
    kent_concrete_derive(w, h);
    kent_curve_derive(w, h);
    for (size_t i = 0; i < h->leg_count; i++) {
        kent_leg_derive(w, h, &h->legs[i]);
    }
}
