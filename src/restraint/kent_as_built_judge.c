/* Which design rules a block breaks as it was built. */
#include "kent_as_built_internal.h"
#include "kent_said.h"

/* Sides within this share of a limit keep it: what a rule or tape measures. */
static const double SLACK = 1e-9;

/* A block larger than designed by more than this moves its centre, and asks for a look.
 * One published detail: at most 10 % over. */
static const double OVERSIZE = 1.1;

static kent_said metres(const kent_holding_work *w, double length)
{
    return kent_said_of(KENT_LENGTH, w->m->units, length);
}

static bool below(double value, double least) { return value < least * (1.0 - SLACK); }
static bool above(double value, double most) { return value > most * (1.0 + SLACK); }

static void judge_sides(const kent_holding_work *w, kent_face face, double depth,
                        kent_notes *notes)
{
    const kent_rules *r = &w->m->rules;
    const double base = depth + 0.5 * face.height;
    const double ratio = face.width / face.height;
    if (above(face.height, r->height_to_depth * base)) {
        kent_notes_add(
            notes,
            "the face is %s high, more than %.2f of the %s from ground to its "
            "base",
            metres(w, face.height).s, r->height_to_depth, metres(w, base).s);
    }
    if (below(face.height, r->least_height)) {
        kent_notes_add(notes, "the face is %s high, less than the least, %s",
                       metres(w, face.height).s, metres(w, r->least_height).s);
    }
    if (r->height_over_diameter > 0.0 &&
        below(face.height, w->site.diameter + r->height_over_diameter)) {
        kent_notes_add(notes, "the face is %s high, less than %s over the pipe's %s",
                       metres(w, face.height).s, metres(w, r->height_over_diameter).s,
                       metres(w, w->site.diameter).s);
    }
    if (below(ratio, r->width_to_height[0]) || above(ratio, r->width_to_height[1])) {
        kent_notes_add(notes,
                       "the face is %.2f times as wide as high, not %.2f to %.2f",
                       ratio, r->width_to_height[0], r->width_to_height[1]);
    }
}

static void judge_thickness(const kent_holding_work *w, kent_face face,
                            double thickness, kent_sense sense, kent_notes *notes)
{
    const kent_rules *r = &w->m->rules;
    if (isnan(thickness)) {
        kent_notes_add(notes, "the thickness as built is not given: whether the thrust "
                              "spreads to the whole side is not told");
        return;
    }
    const double wanted = kent_site_thickness(r, &w->site, face, sense);
    if (!below(thickness, wanted)) return;
    kent_notes_add(notes,
                   "%s thick, less than the %s over which the thrust spreads to the "
                   "whole of that side%s",
                   metres(w, thickness).s, metres(w, wanted).s,
                   below(thickness, r->least_thickness) ? ", and than the least" : "");
}

static void judge_axis(const kent_holding_work *w, const kent_built *built,
                       kent_face face, kent_notes *notes)
{
    const double e = built->axis_above;
    if (isnan(e) || !(fabs(e) > 0.0)) return;
    const double most = w->factored[KENT_SIDEWAYS];
    const double moment = most * fabs(e);
    kent_notes_add(
        notes,
        "the pipe's axis stands %s %s the middle of the face: of the largest "
        "factored thrust that is a moment of %s, and %.2f of the face bears",
        metres(w, fabs(e)).s, e > 0.0 ? "above" : "below",
        kent_said_of(KENT_MOMENT, w->m->units, moment).s,
        kent_built_share(face.height, e));
}

/* What was designed and what was built, in volume. */
static void judge_size(const kent_holding_work *w, const kent_holding *h,
                       const kent_block *b, kent_notes *notes)
{
    const double volume = b->volume + b->face_volume;
    const double designed = h->block.volume + h->block.face_volume;
    if (above(volume, w->m->rules.largest_volume)) {
        kent_notes_add(
            notes,
            "%s of concrete, more than the %s that these rules let be "
            "sized",
            kent_said_of(KENT_VOLUME, w->m->units, volume).s,
            kent_said_of(KENT_VOLUME, w->m->units, w->m->rules.largest_volume).s);
    }
    if (h->block.type != KENT_BLOCK_NONE && h->block.type != b->type) {
        kent_notes_add(notes, "a %s block is built where a %s block was designed",
                       kent_block_word(b->type), kent_block_word(h->block.type));
    } else if (h->block.type != KENT_BLOCK_NONE && above(volume, OVERSIZE * designed)) {
        kent_notes_add(notes,
                       "built %.0f %% larger than designed: look where its middle is, "
                       "and what it leans on",
                       100.0 * (volume / designed - 1.0));
    }
}

/* What stands in the ground before the face that was built, and the fall or fill there.
 * Returns whether that ground may be leant on. */
static bool judge_ground(const kent_holding_work *w, const kent_holding *h,
                         const kent_block *block, kent_notes *notes)
{
    kent_holding_work work = *w; /* to be asked of another block */
    kent_holding built = *h;
    bool leans = true;
    if (!w->soil || !(w->demand.load[KENT_SIDEWAYS] > 0.0)) return true;
    work.clear = (kent_notes){0};
    work.obstacle = NULL;
    built.block = *block;
    if (kent_holding_ground_fault(w, h) != KENT_FAULT_NONE) {
        kent_notes_add(notes,
                       "the ground before the face falls, or is fill, so that the "
                       "rules let no block lean on it");
        leans = false;
    }
    if (!kent_obstacle_clear(&work, &built)) {
        kent_notes_add(notes,
                       "'%s' stands in the wedge of ground that the built face "
                       "leans on",
                       work.obstacle->what);
        leans = false;
    }
    notes->failed = notes->failed || work.clear.failed;
    kent_notes_clear(&work.clear);
    return leans;
}

bool kent_as_built_judge(const kent_holding_work *w, const kent_holding *h,
                         const kent_built *built, const kent_block *block,
                         kent_notes *notes)
{
    const double e = isnan(built->axis_above) ? 0.0 : built->axis_above;
    const double depth = kent_site_axis(&w->site) + e;
    const double least = kent_rules_cover(&w->m->rules, w->site.diameter);
    const bool faced = block->face.width > 0.0 && block->face.height > 0.0;
    if (faced) {
        judge_sides(w, block->face, depth, notes);
        judge_thickness(w, block->face, block->face_thickness, KENT_SIDEWAYS, notes);
        judge_axis(w, built, block->face, notes);
    }
    if (block->type == KENT_BLOCK_BASE) {
        const kent_face plan = {block->width, block->height};
        judge_thickness(w, plan, block->thickness, KENT_DOWNWARD, notes);
    }
    if (below(w->site.cover, least)) {
        kent_notes_add(notes, "a cover of %s is less than the least, %s",
                       metres(w, w->site.cover).s, metres(w, least).s);
    }
    judge_size(w, h, block, notes);
    if (block->type == KENT_BLOCK_BEARING && built->face_width > 0.0) {
        kent_notes_add(notes, "a face beside the block is given, and a bearing block "
                              "has none but its own: it is not counted; say by block "
                              "what was built");
    }
    const bool leans = !faced || judge_ground(w, h, block, notes);
    if (kent_holding_above_ground(w) || kent_holding_in_casing(w)) {
        kent_notes_add(notes, "it stands %s, where a block has no ground to lean on",
                       kent_holding_in_casing(w) ? "in a casing" : "above ground");
        return false;
    }
    if (w->soil && !kent_soil_counts(w->soil)) {
        kent_notes_add(notes,
                       "the soil here, '%s', gives no restraint: what leans on it "
                       "holds nothing",
                       w->soil->id);
    }
    return leans;
}
