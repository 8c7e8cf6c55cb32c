#include "kent_concrete_internal.h"
#include "kent_said.h"
#include "kent_stability_internal.h"

/* s: a peak this short loads a block like a knock. Common practice, no source. */
static const double KNOCK = 0.1;

/* N: beyond it the concrete itself wants designing, where the rules set no other. CIRIA
 * Report 128 (1994) covers blocks to about this thrust without. */
static const double LARGE = 1000e3;

/* The highest pressure of any sense of a case, Pa; NAN: none set. */
static double case_pressure(const kent_load_case *c)
{
    double highest = NAN;
    for (int s = 0; s < KENT_SENSES; s++) {
        if (c->worst[s].set) highest = fmax(highest, c->worst[s].pressure);
    }
    return highest;
}

static void caution_test_pressure(const kent_holding_work *w, kent_holding *h)
{
    const kent_system units = w->m->units;
    const kent_load_case *worst = NULL;
    double test = NAN, highest = 0.0;

    for (size_t i = 0; i < w->loads->count; i++) {
        const kent_load_case *c = &w->loads->cases[i];
        const double p = case_pressure(c);
        if (c->kind == KENT_CASE_TEST) test = p;
        if (c->scenario < 0 || !(p > highest)) continue;
        highest = p;
        worst = c;
    }
    if (!worst || !(highest > test * (1.0 + 1e-9))) return; /* NAN: no test case */
    kent_notes_warn(&h->cautions, "'%s' reaches %s here, above the test pressure of %s",
                    worst->title.s, kent_said_of(KENT_PRESSURE, units, highest).s,
                    kent_said_of(KENT_PRESSURE, units, test).s);
}

/* One instant above 90 % may be the grid's own, however long its step. */
static bool peak_is_short(const kent_load_case *c)
{
    return c->above_90_percent < fmax(KNOCK, 1.5 * c->step);
}

static void caution_peak(const kent_holding_work *w, kent_holding *h)
{
    if (h->governing < 0) return;
    const kent_load_case *c = &w->loads->cases[h->governing];
    if (c->scenario < 0 || !peak_is_short(c)) return;
    kent_notes_add(
        &h->cautions,
        "the governing peak is short: '%s' stays above 90 %% of it for %.3f s",
        c->title.s, c->above_90_percent);
}

/* Whether the ground can be as strong as its bearing says, at this depth. */
static void caution_bearing(const kent_holding_work *w, kent_holding *h)
{
    const kent_soil *s = w->site.leans;
    const kent_system units = w->m->units;
    const kent_bearing_place at = kent_site_place(&w->site, &w->m->rules);
    kent_bearing_claim claim;
    kent_text t = {0};

    if (!s || !kent_bearing_claims(s, &at, &claim)) return;
    if (kent_soil_way(s) == KENT_WAY_COULOMB) return; /* told with what rubs */
    if (!(claim.passive > KENT_PASSIVE_UNLIKELY)) return;
    kent_text_add(
        &t, "soil '%s': %s at this depth asks for a passive coefficient of %.1f", s->id,
        kent_said_of(KENT_STRESS, units, claim.bearing).s, claim.passive);
    if (isnan(s->friction_angle)) {
        kent_text_add(&t, ", which is unlikely (40 degrees give %.1f)",
                      KENT_PASSIVE_UNLIKELY);
    } else {
        kent_text_add(&t, "; its friction angle gives %.1f",
                      kent_rankine_passive(s->friction_angle));
    }
    if (claim.weight_assumed) {
        kent_text_add(&t, "; its unit weight is not given, %s is assumed",
                      kent_said_of(KENT_UNIT_WEIGHT, units, claim.unit_weight).s);
    }
    kent_notes_warn(&h->cautions, "%s", kent_text_of(&t));
    h->cautions.failed = h->cautions.failed || t.failed;
    kent_text_clear(&t);
}

/* Whether a face could press with less than its factor before the ground gives way by
 * its own angle and cohesion, although another bearing is stated. source 10.33 */
static void caution_own_strength(const kent_holding_work *w, kent_holding *h)
{
    const kent_soil *s = w->site.leans;
    const kent_system units = w->m->units;
    const kent_bearing_place at = kent_site_place(&w->site, &w->m->rules);

    if (!s || h->by_sense[KENT_SIDEWAYS] < 0) return;
    if (kent_soil_way(s) == KENT_WAY_COULOMB) return; /* which knows of more strength */
    const kent_load_case *c = &w->loads->cases[h->by_sense[KENT_SIDEWAYS]];
    const double presses =
        w->use[KENT_SIDEWAYS] * w->site.allowable * c->increase / c->safety_factor;
    kent_bearing_gap gap = KENT_BEARING_KNOWN;
    kent_soil own = *s;
    own.passive_share = 1.0;
    const double gives = kent_way_bearing(&own, KENT_WAY_RANKINE, &at, &gap);
    if (!(presses > gives)) return; /* NaN: not known */
    kent_notes_warn(
        &h->cautions,
        "soil '%s' gives way at %s by its own friction angle and cohesion at "
        "this depth, and %s are put on it before any factor: one of its "
        "values is wrong",
        s->id, kent_said_of(KENT_STRESS, units, gives).s,
        kent_said_of(KENT_STRESS, units, presses).s);
}

/* Only the passive route knows of water; other values hold for the ground as tested. */
static void caution_wet(const kent_holding_work *w, kent_holding *h)
{
    const kent_block *b = &h->block;
    const kent_site *site = &w->site;
    const bool base = b->type == KENT_BLOCK_BASE;
    const bool face = w->demand.load[KENT_SIDEWAYS] > 0.0;
    double deepest = -INFINITY; /* m below ground, where a stated value is taken */

    if (!w->soil) return;
    if (face && site->leans->route != KENT_BEARING_PASSIVE) {
        deepest = kent_site_axis(site);
    }
    if (w->demand.load[KENT_DOWNWARD] > 0.0) {
        const double foot =
            base ? 0.5 * site->diameter + b->thickness : 0.5 * b->height;
        deepest = fmax(deepest, kent_site_axis(site) + foot);
    }
    if (!(site->water_table < deepest)) return;
    kent_notes_add(&h->cautions,
                   "the block leans on ground under water, and what soil '%s' bears is "
                   "taken as stated: it must hold for wet ground",
                   w->soil->id);
}

static void caution_block(const kent_holding_work *w, kent_holding *h)
{
    const kent_system units = w->m->units;
    const kent_block *b = &h->block;

    if (b->type == KENT_BLOCK_NONE) return;
    for (size_t i = 0; i < w->clear.count; i++) {
        kent_notes_add(&h->cautions, "%s", w->clear.text[i]);
    }
    if (b->type == KENT_BLOCK_BEARING || b->has_face) {
        caution_bearing(w, h);
        caution_own_strength(w, h);
        kent_ground_caution(w, h);
    }
    kent_footing_caution(w, h);
    caution_wet(w, h);
    if (w->site.hole > 0.0 && !w->site.all_round) {
        kent_notes_add(&h->cautions,
                       "the thrust runs along a trench or comes from either side: both "
                       "faces must reach undisturbed ground, not backfill");
    }
    if (w->demand.load[KENT_UPWARD] > 0.0) {
        if (!w->soil) {
            kent_notes_warn(&h->cautions,
                            "the soil under the gravity block is not stated");
        }
    }
    kent_stability_caution(w, h);
    if (b->submerged) {
        kent_notes_add(&h->cautions,
                       "the block stands in ground water: its concrete is "
                       "taken at its weight less the water's");
    }
    if (isnan(w->fitting->water_table) && w->demand.load[KENT_UPWARD] > 0.0) {
        kent_notes_add(&h->cautions, "no water table is stated: none is assumed");
    }
    const double asked = w->m->rules.largest_thrust;
    const double large = asked > 0.0 ? asked : LARGE;
    if (h->design_thrust > large) {
        kent_notes_add(&h->cautions, "beyond %s the concrete itself must be designed",
                       kent_said_of(KENT_FORCE, units, large).s);
    }
    kent_concrete_caution(w, h);
}

static void caution_joints(const kent_holding_work *w, kent_holding *h)
{
    const kent_leg_rule *rule = kent_leg_rule_of(w->m, w->fitting);
    const bool branch = rule->first > 0; /* its run has no length */
    const bool joints =
        h->chosen == KENT_RESTRAINED_JOINTS || h->chosen == KENT_BLOCK_AND_JOINTS;
    if (!joints || h->leg_count == 0) return;
    const double *run = w->fitting->stated.run_length;
    if (branch && !(run[0] > 0.0) && !(run[1] > 0.0)) {
        kent_notes_add(&h->cautions,
                       "the restrained length of a branch takes no credit "
                       "for the run, whose restrained length is not given");
    }
    kent_notes_add(&h->cautions, "restrained length %s", rule->says);
}

/* What its role and shape ask of whoever builds it. */
static void caution_role(const kent_holding_work *w, kent_holding *h)
{
    if (w->fitting->role == KENT_ROLE_HYDRANT && h->block.type != KENT_BLOCK_NONE) {
        kent_notes_add(&h->cautions,
                       "keep the block clear of the hydrant's drain and its gravel "
                       "pocket, bolts and joints");
    }
    if (h->soil_beside) {
        caution_bearing(w, h);
        caution_own_strength(w, h);
        kent_ground_caution(w, h);
    }
    if (h->soil_beside && h->held && w->site.fill) {
        kent_notes_add(
            &h->cautions,
            "the curve presses on the fill beside the pipe with %s factored: of soil "
            "'%s' and the ground behind it the weaker is counted on",
            kent_said_of(KENT_FORCE_PER_LENGTH, w->m->units, w->side_load).s,
            w->site.fill->id);
    } else if (h->soil_beside && h->held) {
        kent_notes_add(
            &h->cautions,
            "the curve presses on the fill beside the pipe with %s factored: "
            "that fill is taken to bear as much as soil '%s'",
            kent_said_of(KENT_FORCE_PER_LENGTH, w->m->units, w->side_load).s,
            w->soil->id);
    }
}

static void caution_parted(const kent_holding_work *w, kent_holding *h)
{
    if (!w->fitting->parted || h->unbalanced) return;
    kent_notes_warn(
        &h->cautions,
        "no pipe joins all of these fittings: each may be under pressure without the "
        "others, and then pushes another way than the block is sized for");
}

/* Pushes whose sum is held may still turn a group a little: no block here is sized for
 * that (8.15). */
static void caution_couple(const kent_holding_work *w, kent_holding *h)
{
    const kent_couple *c = &w->couple;

    if (w->fitting->type != KENT_GROUP || h->unbalanced) return;
    if (c->largest <= KENT_HOLDING_LEAST * w->fitting->outside_diameter) return;
    kent_notes_warn(&h->cautions,
                    "the pushes of these fittings leave a couple of %s before any "
                    "factor: nothing is sized for it; write apart = true where they "
                    "stand, to have each held by itself",
                    kent_said_of(KENT_MOMENT, w->m->units, c->largest).s);
}

/* Obstacles are held against the wedge before a block's face only. A curve, and a bend
 * with restrained joints, lean on the side of the trench. */
static void caution_near(const kent_holding_work *w, kent_holding *h)
{
    const bool chosen =
        h->chosen == KENT_RESTRAINED_JOINTS || h->chosen == KENT_BLOCK_AND_JOINTS;
    const bool joints = h->held && chosen && kent_leg_bears(w->fitting, w->pull);

    if (!h->soil_beside && !joints) return;
    if (joints && w->site.falls > 0.0) {
        kent_notes_add(
            &h->cautions,
            "the ground falls by %s that way, and the pipe leans on the side of its "
            "trench: what that takes from the restrained lengths is not counted; state "
            "a smaller passive_ratio for the soil here",
            kent_said_of(KENT_ANGLE, w->m->units, w->site.falls).s);
    }
    for (size_t i = 0; i < w->fitting->obstacle_count; i++) {
        const kent_obstacle *o = &w->m->obstacles[w->fitting->obstacle_first + i];
        kent_notes_warn(
            &h->cautions,
            "'%s' stands near, and the pipe leans on the side of its trench: "
            "whether that ground stays is not looked at",
            o->what);
    }
}

void kent_holding_caution(kent_holding_work *w, kent_holding *h)
{
    caution_couple(w, h);
    caution_parted(w, h);
    if (w->fitting->within_deflection) {
        kent_notes_add(&h->cautions,
                       "a turn of %s is within what the joint takes: listed, not held",
                       kent_said_of(KENT_ANGLE, w->m->units, w->fitting->angle).s);
    } else if (h->needs_nothing) {
        const kent_role role = w->fitting->role;
        const bool pulled =
            role == KENT_ROLE_WALL || role == KENT_ROLE_FLANGE_ADAPTOR; /* told below */
        kent_notes_add(&h->cautions, "no load case pushes with more than %s: %s",
                       kent_said_of(KENT_FORCE, w->m->units, KENT_HOLDING_LEAST).s,
                       pulled ? "no block is needed" : "nothing is needed");
    }
    caution_test_pressure(w, h);
    kent_other_ways_caution(w, h);
    kent_loads_caution(w, h);
    if (h->needs_nothing || h->unbalanced) return;
    caution_peak(w, h);
    caution_block(w, h);
    caution_joints(w, h);
    caution_role(w, h);
    caution_near(w, h);
}
