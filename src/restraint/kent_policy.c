/* What the design rules let be built, and which part of the thrust each system of two
 * is for. */
#include "kent_holding_internal.h"
#include "kent_said.h"

static bool is_block(kent_restraint_choice chosen)
{
    switch (chosen) {
    case KENT_THRUST_BLOCK:
    case KENT_ANCHOR_BLOCK:
    case KENT_BLOCK_AND_JOINTS:
        return true;
    case KENT_RESTRAINED_JOINTS:
    case KENT_NO_RESTRAINT:
        break;
    }
    return false;
}

/* Restrained joints in place of a block. */
static void policy_switch(kent_holding_work *w, kent_holding *h, const char *why)
{
    kent_notes_add(&h->cautions,
                   "the rules '%s' %s: restrained joints are taken in place of \"%s\"",
                   w->m->rules.id, why, kent_restraint_word(h->chosen));
    h->chosen = KENT_RESTRAINED_JOINTS;
    w->blocks_forbidden = true;
}

/* A block with restrained joints, each for all of the thrust. */
static void policy_both(const kent_holding_work *w, kent_holding *h)
{
    const char *id = w->m->rules.id;

    if (h->chosen != KENT_BLOCK_AND_JOINTS) {
        kent_notes_add(
            &h->cautions,
            "the rules '%s' want restrained joints with every block: each is "
            "sized for all of the thrust",
            id);
    } else if (w->fitting->stated.block_share < 1.0) {
        kent_notes_add(&h->cautions,
                       "the rules '%s' want block and joints each for all of the "
                       "thrust: block_share, %g, is not used",
                       id, w->fitting->stated.block_share);
    }
    h->chosen = KENT_BLOCK_AND_JOINTS;
    h->block_share = 1.0;
    h->joints_share = 1.0;
}

/* Whether a policy forbids a block here. */
static bool policy_forbids(const kent_holding_work *w, kent_block_policy policy)
{
    switch (policy) {
    case KENT_BLOCKS_ALLOWED:
    case KENT_BLOCKS_WITH_JOINTS:
        break;
    case KENT_BLOCKS_FORBIDDEN:
        return true;
    case KENT_BLOCKS_ON_OLD_MAINS:
        return w->fitting->role != KENT_ROLE_TAPPING;
    }
    return false;
}

static void policy_apply(kent_holding_work *w, kent_holding *h)
{
    const kent_block_policy any = w->m->rules.blocks;
    const kent_block_policy upward = w->demand.load[KENT_UPWARD] > 0.0
                                         ? w->m->rules.vertical_blocks
                                         : KENT_BLOCKS_ALLOWED;

    if (policy_forbids(w, any)) {
        policy_switch(w, h,
                      any == KENT_BLOCKS_ON_OLD_MAINS
                          ? "let blocks be built on mains that lay before only"
                          : "let no block be built");
    } else if (policy_forbids(w, upward)) {
        policy_switch(w, h, "let no block be built against an upward thrust");
    } else if (any == KENT_BLOCKS_WITH_JOINTS || upward == KENT_BLOCKS_WITH_JOINTS) {
        policy_both(w, h);
    }
}

/* Two systems side by side are not simply added: each is for its stated part.
 * source docs/theory/21-ground.md, 21.10 */
static void policy_share(kent_holding_work *w, kent_holding *h)
{
    const double share = w->fitting->stated.block_share;

    if (h->chosen != KENT_BLOCK_AND_JOINTS) return;
    if (isnan(h->block_share)) {
        h->block_share = share;
        h->joints_share = 1.0 - share;
        if (w->fitting->stated.reason[0] == '\0') {
            kent_notes_add(&h->cautions,
                           "two systems hold this together, and no reason is given why "
                           "one alone does not: give reason, or keep one");
        }
    }
    if (isnan(h->block_share)) return; /* refused */
    for (kent_sense s = KENT_RESULTANT; s < KENT_SENSES; s++) {
        w->demand.load[s] *= h->block_share;
    }
    w->pull = kent_vec3_scale(h->joints_share, w->pull);
    if (h->joints_share == 1.0) return; /* by the rules, as was said */
    kent_notes_add(&h->cautions,
                   "block and restrained joints act together: the block is for %.0f %% "
                   "of the thrust, the joints for %.0f %%; they give way by different "
                   "movements, so neither counts for the other's part",
                   100.0 * h->block_share, 100.0 * h->joints_share);
}

void kent_holding_policy(kent_holding_work *w, kent_holding *h)
{
    if (h->needs_nothing || h->unbalanced || !is_block(h->chosen)) return;
    policy_apply(w, h);
    policy_share(w, h);
}
