/* A block in place of restrained joints, and why one of both cannot be. */
#include "kent_concrete_internal.h"

static const char *fault_says(kent_fault fault)
{
    switch (fault) {
    case KENT_FAULT_NONE:
        break;
    case KENT_FAULT_COVER_UNSTATED:
        return "cover not stated";
    case KENT_FAULT_SHALLOW:
        return "too little cover";
    case KENT_FAULT_BEARING:
        return "bearing not known";
    case KENT_FAULT_FACE:
        return "no face is large enough";
    case KENT_FAULT_OBSTACLE:
        return "something in its ground";
    case KENT_FAULT_CONCRETE:
        return "its concrete would crush";
    case KENT_FAULT_STABILITY:
        return "it would not stay in place";
    case KENT_FAULT_VOLUME:
        return "too large";
    case KENT_FAULT_VERTICAL:
        return "no vertical_bearing";
    case KENT_FAULT_SOIL_UNSTATED:
        return "soil not stated";
    case KENT_FAULT_ABOVE_GROUND:
        return "above ground";
    case KENT_FAULT_CASING:
        return "in a casing";
    case KENT_FAULT_SLOPE:
        return "the ground falls away";
    case KENT_FAULT_FILL:
        return "fill before it";
    case KENT_FAULT_OTHER_WAY:
        return "it is pushed another way too";
    case KENT_FAULT_SHARE:
        return "no block_share";
    case KENT_FAULT_SOIL:
        return "ground holds nothing";
    }
    return NULL;
}

static const struct {
    unsigned lack;
    const char *says;
} LACKS[] = {
    {KENT_LACK_OLD_MAIN, "old main slips"},
    {KENT_LACK_PIPE, "no pipe there"},
    {KENT_LACK_COVER, "cover not stated"},
    {KENT_LACK_PIPE_MASS, "mass of pipe not known"},
    {KENT_LACK_SOIL, "ground holds nothing"},
    {KENT_LACK_SOUND, "no sound ground"},
    {KENT_LACK_GRIP, "no friction"},
    {KENT_LACK_PIECES, "ground changes too often"},
};

static const char *lack_says(unsigned lack)
{
    for (size_t i = 0; i < sizeof LACKS / sizeof LACKS[0]; i++) {
        if (lack & LACKS[i].lack) return LACKS[i].says;
    }
    return lack != 0 ? "the soil lacks values" : NULL;
}

/* As if a block had been asked for; its notes are nobody's. */
static void try_block(const kent_holding_work *w, kent_holding *h)
{
    kent_holding_work trial = *w;
    kent_holding instead = *h;

    trial.met = trial.clear = (kent_notes){0};
    trial.fault = KENT_FAULT_NONE;
    trial.obstacle = NULL;
    instead.cautions = instead.remarks = (kent_notes){0};
    instead.derivation = (kent_derivation){0};
    instead.chosen = KENT_THRUST_BLOCK;
    instead.held = false;
    instead.block = kent_block_none();
    for (kent_sense s = KENT_RESULTANT; s < KENT_SENSES; s++) {
        trial.use[s] = 0.0;
    }
    kent_concrete_prepare(&trial, &instead);
    kent_holding_size(&trial, &instead);
    kent_other_ways_take(&trial, &instead);
    kent_other_ways_judge(&trial, &instead);
    kent_concrete_finish(&trial, &instead);
    if (instead.held) {
        h->either.block = instead.block;
        h->either.quantities = instead.quantities;
    }
    h->either.no_block = instead.held ? NULL : fault_says(trial.fault);
    h->cautions.failed |= instead.cautions.failed || instead.remarks.failed ||
                          instead.derivation.failed || trial.clear.failed;
    kent_notes_clear(&instead.cautions);
    kent_notes_clear(&instead.remarks);
    kent_derivation_clear(&instead.derivation);
    kent_notes_clear(&trial.met);
    kent_notes_clear(&trial.clear);
}

void kent_holding_either(const kent_holding_work *w, kent_holding *h)
{
    switch (h->chosen) {
    case KENT_NO_RESTRAINT:
        return;
    case KENT_RESTRAINED_JOINTS:
        if (w->blocks_forbidden) {
            h->either.no_block = "the design rules";
        } else {
            try_block(w, h);
        }
        break;
    case KENT_THRUST_BLOCK:
    case KENT_ANCHOR_BLOCK:
    case KENT_BLOCK_AND_JOINTS:
        h->either.block = h->block;
        h->either.quantities = h->quantities;
        h->either.no_block = fault_says(w->fault);
        break;
    }
    h->either.looked_at = true;
    if (h->either.joints) return;
    h->either.no_length = lack_says(w->lack);
    if (!h->either.no_length && h->leg_count == 0) {
        h->either.no_length = "no pipe there";
    }
}
