#include "kent_concrete_internal.h"
#include "kent_stability_internal.h"

/* Loads nearer than this, relative, are a tie: the case listed first governs. The
 * steady state and the start of a march differ in their last digits. */
static const double TIE = 1e-9;

double kent_holding_part(const kent_load_case *c, kent_sense sense)
{
    const kent_instant *at = &c->worst[sense];
    if (!at->set) return 0.0;

    const kent_vec3 t = kent_instant_lasting(at);
    switch (sense) {
    case KENT_SIDEWAYS:
        return kent_thrust_horizontal(t);
    case KENT_UPWARD:
        return fmax(0.0, t.z);
    case KENT_DOWNWARD:
        return fmax(0.0, -t.z);
    case KENT_RESULTANT:
    case KENT_SENSES:
        break;
    }
    return kent_vec3_length(t);
}

double kent_holding_load(const kent_load_case *c, kent_sense sense)
{
    const bool bears = sense == KENT_SIDEWAYS || sense == KENT_DOWNWARD;
    return c->safety_factor * kent_holding_part(c, sense) / (bears ? c->increase : 1.0);
}

/* ---- what governs ---------------------------------------------------------------- */

/* The case with the greatest factored load of a sense; -1 where no case has any. Beside
 * another, which is left out (-1: none): of those that push sideways the same way. */
static int case_greatest(const kent_fitting_loads *loads, kent_sense sense, int beside,
                         double *load)
{
    const kent_load_case *known =
        beside >= 0 && sense == KENT_SIDEWAYS ? &loads->cases[beside] : NULL;
    int greatest = -1;

    *load = 0.0;
    for (size_t i = 0; i < loads->count; i++) {
        const kent_load_case *c = &loads->cases[i];
        const double factored = kent_holding_load(c, sense);
        if ((int)i == beside || !(factored > *load * (1.0 + TIE))) continue;
        if (known && !kent_one_way(known, c)) continue;
        greatest = (int)i;
        *load = factored;
    }
    return greatest;
}

/* The sense with the greatest of these, sideways first where they tie. */
static kent_sense sense_greatest(const double by_sense[KENT_SENSES])
{
    kent_sense greatest = KENT_SIDEWAYS;

    for (kent_sense s = KENT_UPWARD; s <= KENT_DOWNWARD; s++) {
        if (by_sense[s] > by_sense[greatest] * (1.0 + TIE)) greatest = s;
    }
    return greatest;
}

static void holding_govern(const kent_holding_work *w, kent_holding *h,
                           kent_sense sense)
{
    h->sense = sense;
    h->governing = h->by_sense[sense];
    h->design_thrust = w->factored[sense];
    if (h->governing < 0) return;
    h->factor_asked = w->loads->cases[h->governing].safety_factor;
    h->runner_up = case_greatest(w->loads, sense, h->governing, &h->runner_up_load);
    if (h->runner_up < 0) h->runner_up_load = NAN;
    h->runner_up_margin = h->design_thrust / h->runner_up_load - 1.0;
}

static double greatest_unfactored(const kent_fitting_loads *loads)
{
    double greatest = 0.0;
    for (size_t i = 0; i < loads->count; i++) {
        greatest = fmax(greatest, kent_holding_part(&loads->cases[i], KENT_RESULTANT));
    }
    return greatest;
}

void kent_holding_find(kent_holding_work *w, kent_holding *h)
{
    for (kent_sense s = KENT_RESULTANT; s < KENT_SENSES; s++) {
        h->by_sense[s] = case_greatest(w->loads, s, -1, &w->factored[s]);
        const bool counts =
            w->factored[s] > KENT_BLOCK_NEGLIGIBLE * w->factored[KENT_RESULTANT];
        w->demand.load[s] = counts ? w->factored[s] : 0.0;
    }
    holding_govern(w, h, sense_greatest(w->factored));
    h->needs_nothing = w->fitting->within_deflection ||
                       !(greatest_unfactored(w->loads) >= KENT_HOLDING_LEAST);
    kent_other_ways_find(w, h);
    if (h->by_sense[KENT_RESULTANT] < 0) return;
    const kent_load_case *c = &w->loads->cases[h->by_sense[KENT_RESULTANT]];
    w->pull = kent_instant_lasting(&c->worst[KENT_RESULTANT]);
    w->pull_factor = c->safety_factor;
}

/* ---- a block --------------------------------------------------------------------- */

bool kent_holding_above_ground(const kent_holding_work *w)
{
    bool above = false;

    for (size_t k = 0; k < w->fitting->port_count; k++) {
        const kent_port *p = &w->m->ports[w->fitting->port_first + k];
        if (p->span < 0) continue;
        if (!w->m->pipes[w->m->spans[p->span].pipe].above_ground) return false;
        above = true;
    }
    return above;
}

bool kent_holding_in_casing(const kent_holding_work *w)
{
    const int zone = w->fitting->zone;

    return zone >= 0 && w->m->ground_zones[zone].casing;
}

static kent_fault holding_soil_fault(const kent_holding_work *w, const kent_holding *h)
{
    const bool leans =
        w->demand.load[KENT_SIDEWAYS] > 0.0 || w->demand.load[KENT_DOWNWARD] > 0.0;

    if (kent_holding_above_ground(w)) return KENT_FAULT_ABOVE_GROUND;
    if (kent_holding_in_casing(w)) return KENT_FAULT_CASING;
    if (!w->soil) return leans ? KENT_FAULT_SOIL_UNSTATED : KENT_FAULT_NONE;
    if (!kent_soil_counts(w->soil)) return KENT_FAULT_SOIL;
    return kent_holding_ground_fault(w, h);
}

/* A gravity block may stand under a thrust that is downward alone. */
static kent_sense holding_body_sense(const kent_holding_work *w, kent_block_type type)
{
    switch (type) {
    case KENT_BLOCK_GRAVITY:
        return w->demand.load[KENT_UPWARD] > 0.0 ? KENT_UPWARD : KENT_DOWNWARD;
    case KENT_BLOCK_BASE:
        return KENT_DOWNWARD;
    case KENT_BLOCK_NONE:
    case KENT_BLOCK_BEARING:
        break;
    }
    return KENT_SIDEWAYS;
}

/* What the block reaches, and which sense uses most of it. */
static void holding_reach(kent_holding_work *w, kent_holding *h)
{
    kent_block *b = &h->block;
    const kent_sense own = holding_body_sense(w, b->type);

    b->sense = own;
    kent_block_use(b, &w->m->rules, &w->site, &w->demand, w->use);
    const kent_load_case *c = &w->loads->cases[h->by_sense[own]];
    b->utilisation = w->use[own];
    b->factor_reached = c->safety_factor / b->utilisation;
    if (b->has_face) b->face_utilisation = w->use[KENT_SIDEWAYS];
    if (own == KENT_DOWNWARD) {
        b->bearing_pressure = w->use[KENT_DOWNWARD] * w->site.vertical;
    } else if (w->use[KENT_SIDEWAYS] > 0.0) {
        b->bearing_pressure = w->use[KENT_SIDEWAYS] * w->site.allowable;
    }

    holding_govern(w, h, sense_greatest(w->use));
    h->held = true;
    h->utilisation = w->use[h->sense];
    h->factor_reached = h->factor_asked / h->utilisation;
}

static void holding_block(kent_holding_work *w, kent_holding *h)
{
    w->fault = holding_soil_fault(w, h);
    if (h->chosen == KENT_BLOCK_AND_JOINTS && isnan(h->block_share)) {
        w->fault = KENT_FAULT_SHARE;
    }
    if (w->fault == KENT_FAULT_NONE) {
        w->fault = kent_block_size(&w->m->rules, &w->site, &w->demand, &h->block);
    }
    if (w->fault == KENT_FAULT_NONE) w->fault = kent_stability_settle(w, h);
    if (w->fault == KENT_FAULT_NONE && !kent_obstacle_clear(w, h)) {
        w->fault = KENT_FAULT_OBSTACLE;
    }
    if (w->fault == KENT_FAULT_NONE && !kent_concrete_bears(w, h)) {
        w->fault = KENT_FAULT_CONCRETE;
    }
    if (w->fault == KENT_FAULT_NONE) {
        holding_reach(w, h);
        return;
    }
    const double area = h->block.bearing_area;
    h->block = kent_block_none();
    h->block.bearing_area = area; /* what was asked for still tells something */
}

/* A curve leans on the soil beside the pipe, all along.
 * source docs/theory/10-blocks.md, 10.28, 10.29 */
static void holding_curve(kent_holding_work *w, kent_holding *h)
{
    const kent_fitting *f = w->fitting;
    const double sideways = w->demand.load[KENT_SIDEWAYS];
    const bool level =
        w->demand.load[KENT_UPWARD] <= 0.0 && w->demand.load[KENT_DOWNWARD] <= 0.0;

    w->side_load = kent_curve_side_load(sideways, f->angle, f->curve_radius);
    if (kent_holding_above_ground(w) || kent_holding_in_casing(w)) return;
    if (!level || !(sideways > 0.0) || !kent_soil_counts(w->soil)) return;
    w->fault = kent_holding_ground_fault(w, h);
    if (w->fault != KENT_FAULT_NONE) return;
    const double use = w->side_load / (w->site.allowable * w->site.diameter);
    if (isnan(use)) return;
    holding_govern(w, h, KENT_SIDEWAYS);
    w->use[KENT_SIDEWAYS] = use;
    h->utilisation = use;
    h->factor_reached = h->factor_asked / use;
    h->held = use <= 1.0;
}

void kent_holding_size(kent_holding_work *w, kent_holding *h)
{
    if (h->soil_beside) {
        holding_curve(w, h);
        return;
    }
    switch (h->chosen) {
    case KENT_THRUST_BLOCK:
    case KENT_ANCHOR_BLOCK:
    case KENT_BLOCK_AND_JOINTS:
        holding_block(w, h);
        break;
    case KENT_RESTRAINED_JOINTS:
    case KENT_NO_RESTRAINT:
        break;
    }
}

/* ---- restrained length ----------------------------------------------------------- */

/* Whether the legs hold the thrust, or the joints' part of it; *use: how much of what
 * they could, where they do. */
static bool joints_hold(const kent_holding_work *w, const kent_holding *h,
                        size_t wanted, double *use)
{
    const bool either = kent_leg_rule_of(w->m, w->fitting)->either;
    size_t fitting = 0;

    *use = 0.0;
    for (size_t i = 0; i < h->leg_count; i++) {
        if (!h->legs[i].fits) continue;
        fitting++;
        *use = fmax(*use, kent_leg_use(w->m, w->fitting, &h->legs[i]));
    }
    return wanted > 0 && (either ? fitting > 0 : fitting == wanted);
}

static void holding_joints(kent_holding_work *w, kent_holding *h, size_t wanted)
{
    double use = 0.0;

    h->held = joints_hold(w, h, wanted, &use);
    holding_govern(w, h, KENT_RESULTANT);
    if (!h->held) return;
    h->utilisation = use;
    h->factor_reached = h->factor_asked / use;
}

/* Block and joints: both must do their part, and whichever uses more is told. */
static void holding_both(kent_holding_work *w, kent_holding *h, size_t wanted)
{
    const bool block = h->held;
    double use = 0.0;

    h->held = joints_hold(w, h, wanted, &use) && block;
    if (!h->held) {
        h->block = kent_block_none();
        h->utilisation = NAN;
        h->factor_reached = NAN;
    } else if (use > h->utilisation) {
        holding_govern(w, h, KENT_RESULTANT);
        h->utilisation = use;
        h->factor_reached = h->factor_asked / use;
    }
}

/* A sleeve holds on to a main that lay there before: what its joints do is not known.
 */
static bool on_old_main(const kent_holding_work *w)
{
    const kent_port *run = &w->m->ports[w->fitting->port_first];

    if (w->fitting->role != KENT_ROLE_TAPPING) return false;
    if (run->span < 0) return true;
    return kent_joint_slips(w->m->pipes[w->m->spans[run->span].pipe].joint);
}

void kent_holding_legs(kent_holding_work *w, kent_holding *h)
{
    if (on_old_main(w)) {
        w->lack |= KENT_LACK_OLD_MAIN;
        if (h->chosen == KENT_BLOCK_AND_JOINTS) holding_both(w, h, 0);
        return;
    }
    const kent_leg_rule *rule = kent_leg_rule_of(w->m, w->fitting);
    const size_t end = rule->first + rule->count < w->fitting->port_count
                           ? rule->first + rule->count
                           : w->fitting->port_count;
    size_t wanted = 0;

    for (size_t k = rule->first; k < end; k++) {
        kent_leg_work work;
        const unsigned lack = kent_leg_prepare(w->m, w->standings, w->index, k, w->pull,
                                               w->pull_factor, &work);
        wanted++;
        w->lack |= lack;
        if (work.lacking) w->lacking = work.lacking;
        if (lack != 0) continue;
        h->legs[h->leg_count++] = kent_leg_of(w, k, &work);
        h->restrained_length = fmax(h->restrained_length, work.length);
    }
    double use = 0.0;
    h->either.joints = joints_hold(w, h, wanted, &use);
    if (h->either.joints) h->joints_use = use;
    if (h->chosen == KENT_RESTRAINED_JOINTS) holding_joints(w, h, wanted);
    if (h->chosen == KENT_BLOCK_AND_JOINTS) holding_both(w, h, wanted);
}
