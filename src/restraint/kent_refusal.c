#include "kent_earth.h"
#include "kent_holding_internal.h"
#include "kent_said.h"
#include "kent_stability_internal.h"
#include "kent_wedge.h"

static const struct {
    unsigned lack;
    const char *key;
} KEYS[] = {
    {KENT_LACK_UNIT_WEIGHT, "unit_weight"},
    {KENT_LACK_FRICTION_ANGLE, "friction_angle"},
    {KENT_LACK_COHESION, "cohesion"},
    {KENT_LACK_FRICTION_RATIO, "friction_ratio"},
    {KENT_LACK_ADHESION_RATIO, "adhesion_ratio"},
    {KENT_LACK_PASSIVE_RATIO, "passive_ratio"},
};

/* "restrained joints over 24.40 m on each leg", or why there are none. */
static void joints_offer(const kent_holding_work *w, const kent_holding *h,
                         kent_text *t)
{
    bool fits = h->leg_count > 0;

    for (size_t i = 0; i < h->leg_count; i++) {
        fits = fits && h->legs[i].fits;
    }
    if (w->lack & KENT_LACK_OLD_MAIN) {
        kent_text_add(t, "a structure of its own");
        return;
    }
    if (h->leg_count == 0) {
        kent_text_add(t, "restrained joints, once their length can be worked out");
        return;
    }
    kent_text_add(t, "restrained joints over %s %s%s",
                  kent_said_of(KENT_LENGTH, w->m->units, h->restrained_length).s,
                  kent_leg_rule_of(w->m, w->fitting)->says,
                  fits ? "" : " and beyond what they meet");
}

static void refuse_face(const kent_holding_work *w, const kent_holding *h, kent_text *t)
{
    const kent_system units = w->m->units;
    const double sideways = w->demand.load[KENT_SIDEWAYS];
    const double limit = kent_face_height_limit(&w->m->rules, kent_site_axis(&w->site));
    const double cover = kent_face_cover_needed(&w->m->rules, &w->site, sideways);
    const double bearing = kent_face_bearing_needed(&w->m->rules, &w->site, sideways);
    const char *sep = "";

    kent_text_add(
        t,
        "no block: a face of %s does not fit under the greatest height of "
        "%s at this depth; ",
        kent_said_of(KENT_AREA, units, h->block.bearing_area + w->site.hole).s,
        kent_said_of(KENT_LENGTH, units, limit).s);
    if (!isnan(cover)) {
        kent_text_add(t, "a cover of %s would serve",
                      kent_said_of(KENT_LENGTH, units, cover).s);
        sep = ", or ";
    }
    if (!isnan(bearing)) {
        kent_text_add(t, "%sground that bears %s", sep,
                      kent_said_of(KENT_STRESS, units, bearing).s);
        sep = ", or ";
    }
    kent_text_add(t, "%s", sep);
    joints_offer(w, h, t);
}

/* How far it is to ground that can be relied on, along each pipe of the fitting. */
static bool sound_ground(const kent_holding_work *w, kent_text *t)
{
    const kent_model *m = w->m;
    const kent_fitting *f = w->fitting;
    const char *sep = "carry the restraint ";

    for (size_t k = 0; k < f->port_count; k++) {
        const kent_port *p = &m->ports[f->port_first + k];
        if (p->span < 0 || p->toward < 0) continue;
        const kent_sound sound = kent_leg_sound(m, p);
        if (sound.distance <= 0.0) continue; /* nothing lies that way */
        const kent_said far = kent_said_whole(KENT_LENGTH, m->units, sound.distance);
        const char *toward = m->points[p->toward].id;
        if (!sound.soil) {
            kent_text_add(t,
                          "%smore than the %s of pipe towards %s (no sound ground "
                          "along it)",
                          sep, far.s, toward);
        } else {
            kent_text_add(t, "%s%s towards %s into the %s at %s", sep, far.s, toward,
                          sound.soil->id,
                          sound.point >= 0 ? m->points[sound.point].id
                                           : "the edge of its zone");
        }
        sep = " and ";
    }
    return sep[0] == ' ';
}

/* What is wrong with ground of each nature. */
static const char *nature_says(kent_nature nature)
{
    switch (nature) {
    case KENT_NATURAL:
        return "";
    case KENT_FILL:
        return " a fill not placed under control,";
    case KENT_ORGANIC:
        return " organic ground that yields without end,";
    case KENT_EXPANSIVE:
        return " ground that swells and shrinks with its water,";
    case KENT_LIQUEFIABLE:
        return " ground that turns liquid when it is shaken,";
    case KENT_COLLAPSIBLE:
        return " ground that collapses once it is wetted, as a leak would,";
    }
    return "";
}

/* What makes it good, or does without it. */
static const char *nature_way_out(kent_nature nature)
{
    switch (nature) {
    case KENT_NATURAL:
        return "support the fitting on piles, tie it by rods to a block in sound "
               "ground, or replace this soil";
    case KENT_FILL:
        return "dig it out down to natural ground and replace it, from the pit to "
               "where "
               "the wedge before the face ends, by fill compacted in layers with its "
               "density proved (90 to 95 % of Proctor's is commonly asked), or support "
               "the fitting on piles, or tie it by rods to a block in sound ground";
    case KENT_ORGANIC:
        return "replace it through its whole depth, or support the fitting on piles "
               "that reach firm ground, and tie it to them by rods";
    case KENT_EXPANSIVE:
        return "replace it by ground that does not swell to below the depth that dries "
               "and wets, with drainage that keeps water away, or support the fitting "
               "on piles from below that depth";
    case KENT_LIQUEFIABLE:
        return "have it densified or drained and its density proved, or support the "
               "fitting on piles that reach below it and are designed for its loss";
    case KENT_COLLAPSIBLE:
        return "have it compacted or wetted beforehand under control with proof, or "
               "replaced, and drained so that no leak reaches it, or support the "
               "fitting on piles below it";
    }
    return "";
}

static void refuse_soil(const kent_holding_work *w, kent_text *t)
{
    if (!w->soil) return; /* another fault */
    const kent_nature nature = w->soil->nature;

    kent_text_add(t, "the soil here, '%s',%s gives no restraint: ", w->soil->id,
                  nature_says(nature));
    if (sound_ground(w, t)) kent_text_add(t, " by restrained joints, or ");
    kent_text_add(t, "%s", nature_way_out(nature));
    if (nature == KENT_NATURAL) return;
    kent_text_add(t, "; of ground made good with proof write unreliable = false");
}

/* No published reduction tells what a soil bears before ground that falls so. */
static void refuse_falling(const kent_holding_work *w, const kent_soil *s, kent_text *t)
{
    kent_text_add(t,
                  "no block: the ground before its face falls by %s along the thrust",
                  kent_said_of(KENT_ANGLE, w->m->units, w->site.falls).s);
    if (isnan(s->friction_angle)) {
        kent_text_add(t,
                      ", and soil '%s' states no friction_angle, which tells what that "
                      "leaves of its bearing; give it, level the ground, or ",
                      s->id);
        return;
    }
    kent_text_add(t,
                  ", as much as the %s at which soil '%s' stands by itself: nothing "
                  "may lean on it; level the ground, tie the fitting back to ground "
                  "uphill, or ",
                  kent_said_of(KENT_ANGLE, w->m->units, s->friction_angle).s, s->id);
}

/* Why the soil's bearing is not known here, and what would tell it. */
static void refuse_bearing(const kent_holding_work *w, kent_text *t)
{
    const kent_soil *s = w->site.leans;
    const kent_system units = w->m->units;
    const double axis = kent_site_axis(&w->site);

    if (!s) return; /* another fault */
    switch (w->site.gap) {
    case KENT_BEARING_KNOWN:
        kent_text_add(t,
                      "no block: soil '%s' bears nothing at a depth of %s; lay the "
                      "main deeper, or ",
                      s->id, kent_said_of(KENT_LENGTH, units, axis).s);
        return;
    case KENT_BEARING_NO_DEPTH: /* no cover: another fault, before this one */
        break;
    case KENT_BEARING_ABOVE_TABLE:
        kent_text_add(t,
                      "no block: the bearing of soil '%s' is given from %s down, and "
                      "the centre of the face lies at %s; lay the main deeper, state "
                      "what the soil bears there, or ",
                      s->id, kent_said_of(KENT_LENGTH, units, s->by_depth[0].depth).s,
                      kent_said_of(KENT_LENGTH, units, axis).s);
        return;
    case KENT_BEARING_LACKS:
        kent_text_add(t,
                      "no block: the passive pressure of soil '%s' wants unit_weight, "
                      "friction_angle and cohesion; give all three, or ",
                      s->id);
        return;
    case KENT_BEARING_NO_PLANE:
        kent_text_add(
            t,
            "no block: with a wall_friction of %s Coulomb's plane tells no "
            "passive pressure of soil '%s'; state at most %s, a third of its "
            "friction angle, or no wall_friction, or ",
            kent_said_of(KENT_ANGLE, units, s->wall_friction).s, s->id,
            kent_said_of(KENT_ANGLE, units, kent_coulomb_limit(s->friction_angle)).s);
        return;
    case KENT_BEARING_FALLS:
        refuse_falling(w, s, t);
        return;
    }
}

/* Fill before the face, of which nobody says what it is, or which bears nothing. */
static void refuse_fill(const kent_holding_work *w, kent_text *t)
{
    const int fill = w->fitting->backfill;

    if (fill < 0) {
        kent_text_add(t, "no block: its face stands against fill, and which soil that "
                         "is is not stated; give ground.backfill, carry the face to "
                         "undisturbed ground, or ");
        return;
    }
    kent_text_add(t,
                  "no block: its face stands against fill of soil '%s', which gives no "
                  "restraint; compact it in layers with its density proved and state "
                  "what it then bears, carry the face to undisturbed ground, or ",
                  w->m->soils[fill].id);
}

static void refuse_obstacle(const kent_holding_work *w, kent_text *t)
{
    const kent_system units = w->m->units;
    const kent_obstacle *o = w->obstacle;

    kent_text_add(t,
                  "no block: its face would lean on '%s', %s from the fitting and %s "
                  "deep, within the wedge of ground that holds it (%s from the face at "
                  "the surface",
                  o->what, kent_said_of(KENT_LENGTH, units, o->distance).s,
                  kent_said_of(KENT_LENGTH, units, o->depth).s,
                  kent_said_of(KENT_LENGTH, units, w->reach).s);
    if (w->soil && isnan(w->soil->friction_angle)) {
        kent_text_add(t, "; friction angle not given, %s is taken",
                      kent_said_of(KENT_ANGLE, units, KENT_WEDGE_ANGLE).s);
    }
    kent_text_add(t, "); move one of them, or ");
}

static void refuse_concrete(const kent_holding_work *w, const kent_holding *h,
                            kent_text *t)
{
    const kent_system units = w->m->units;
    const kent_concrete_check *c = &h->concrete;

    kent_text_add(
        t,
        "no block: the fitting would press on the %s of concrete stated as "
        "contact_area with %s, and concrete of %s takes %s there; let it press "
        "on %s, take stronger concrete, or ",
        kent_said_of(KENT_AREA, units, c->contact.width * c->contact.height).s,
        kent_said_of(KENT_STRENGTH, units, c->pressure).s,
        kent_said_of(KENT_STRENGTH, units, c->strength).s,
        kent_said_of(KENT_STRENGTH, units, c->allowed).s,
        kent_said_of(KENT_AREA, units, c->contact_needed).s);
}

static void refuse_unstable(const kent_holding_work *w, const kent_holding *h,
                            kent_text *t)
{
    char words[96];

    kent_stability_says(&h->stability, words, sizeof words);
    kent_text_add(t,
                  "no block: at the largest that these rules let be sized, %s, it does "
                  "not stay in place (%s); firmer ground, a structure of its own, or ",
                  kent_said_of(KENT_VOLUME, w->m->units, w->m->rules.largest_volume).s,
                  words);
}

static void refuse_above_ground(const kent_holding_work *w, const kent_holding *h,
                                kent_text *t)
{
    const kent_system units = w->m->units;

    kent_text_add(t,
                  "no block: this stands above ground, where no soil bears: hold "
                  "it by a structure made for %s factored, or carry the push by "
                  "flanges, welds or restrained joints into pipe that is held",
                  kent_said_of(KENT_FORCE, units, h->design_thrust).s);
}

static void refuse_shallow(const kent_holding_work *w, kent_text *t)
{
    const kent_system units = w->m->units;
    const kent_rules *rules = &w->m->rules;

    kent_text_add(
        t,
        "no block: a cover of %s is less than the least, %s; lay the "
        "main that deep, or ",
        kent_said_of(KENT_LENGTH, units, w->site.cover).s,
        kent_said_of(KENT_LENGTH, units, kent_rules_cover(rules, w->site.diameter)).s);
}

static void refuse_vertical(const kent_holding_work *w, kent_text *t)
{
    kent_text_add(t,
                  "no block: it would stand on soil '%s', whose bearing under a "
                  "base is not stated, and one that goes with depth is for faces; "
                  "give vertical_bearing",
                  w->soil->id);
    if (kent_soil_source(w->soil) == KENT_CATALOGUE) {
        kent_text_add(t, " to an element of soils, from = \"%s\"", w->soil->id);
    }
    kent_text_add(t, ", or ");
}

static void refuse_slope(const kent_holding_work *w, kent_text *t)
{
    const kent_system units = w->m->units;
    const kent_rules *rules = &w->m->rules;

    kent_text_add(t,
                  "no block: the ground before its face falls by %s along the "
                  "thrust, and these rules allow %s; level it, tie the fitting back "
                  "to ground uphill, or ",
                  kent_said_of(KENT_ANGLE, units, w->site.falls).s,
                  kent_said_of(KENT_ANGLE, units, rules->steepest_ground).s);
}

static void refuse_block(const kent_holding_work *w, const kent_holding *h,
                         kent_text *t)
{
    const kent_system units = w->m->units;
    const kent_rules *rules = &w->m->rules;

    switch (w->fault) {
    case KENT_FAULT_NONE:
        return;
    case KENT_FAULT_SOIL_UNSTATED:
        kent_text_add(t, "no block: the soil is not stated; give ground.soil, or soil "
                         "where this stands");
        return;
    case KENT_FAULT_ABOVE_GROUND:
        refuse_above_ground(w, h, t);
        return;
    case KENT_FAULT_CASING:
        kent_text_add(t,
                      "no block: this stands in a casing, which keeps the ground off "
                      "it; end the casing before it, or ");
        break;
    case KENT_FAULT_COVER_UNSTATED:
        kent_text_add(t, "no block: the cover is not stated; give ground.cover, or "
                         "cover where this stands");
        return;
    case KENT_FAULT_SHALLOW:
        refuse_shallow(w, t);
        break;
    case KENT_FAULT_BEARING:
        refuse_bearing(w, t);
        break;
    case KENT_FAULT_VERTICAL:
        refuse_vertical(w, t);
        break;
    case KENT_FAULT_OBSTACLE:
        refuse_obstacle(w, t);
        break;
    case KENT_FAULT_CONCRETE:
        refuse_concrete(w, h, t);
        break;
    case KENT_FAULT_VOLUME:
        kent_text_add(t,
                      "no block: it would be larger than the %s that these rules let "
                      "be sized; better ground, a structure of its own, or ",
                      kent_said_of(KENT_VOLUME, units, rules->largest_volume).s);
        break;
    case KENT_FAULT_SLOPE:
        refuse_slope(w, t);
        break;
    case KENT_FAULT_FILL:
        refuse_fill(w, t);
        break;
    case KENT_FAULT_SHARE:
        kent_text_add(t, "block and joints are asked for together, and not which part "
                         "of the thrust the block is for; give block_share");
        return;
    case KENT_FAULT_STABILITY:
        refuse_unstable(w, h, t);
        break;
    case KENT_FAULT_OTHER_WAY:
        kent_other_way_refuse(w, h, t);
        kent_text_add(t, ", or ");
        break;
    case KENT_FAULT_FACE:
        refuse_face(w, h, t);
        return;
    case KENT_FAULT_SOIL:
        refuse_soil(w, t);
        return;
    }
    joints_offer(w, h, t);
}

/* What keeps lengths from being given, unless the ground itself does. */
static void refuse_lengths(const kent_holding_work *w, const kent_holding *h,
                           kent_notes *notes)
{
    const bool joints = h->chosen == KENT_RESTRAINED_JOINTS;
    const bool both = h->chosen == KENT_BLOCK_AND_JOINTS;
    kent_text t = {0};

    for (size_t i = 0; i < sizeof KEYS / sizeof KEYS[0]; i++) {
        if (!(w->lack & KEYS[i].lack)) continue;
        kent_text_add(&t, "%s%s", t.length ? ", " : "", KEYS[i].key);
    }
    if (t.length > 0) {
        kent_notes_add(notes, "no restrained length: soil '%s' lacks %s%s",
                       w->lacking->id, kent_text_of(&t),
                       !joints || h->held    ? ""
                       : w->blocks_forbidden ? "; give it in soils"
                                             : "; give it in soils, or write restraint "
                                               "= \"thrust-block\" in fittings");
    }
    if (w->lack & KENT_LACK_COVER) {
        kent_notes_add(notes, "no restrained length: the cover is not stated");
    }
    if (w->lack & KENT_LACK_PIPE_MASS) {
        kent_notes_add(notes,
                       "no restrained length: the mass of the pipe is not known; "
                       "give its pipe_class, or "
                       "its material and wall_thickness");
    }
    if (w->lack & KENT_LACK_GRIP) {
        kent_notes_add(notes,
                       "no restrained length: soil '%s' as given makes no friction "
                       "on the pipe",
                       w->soil->id);
    }
    if (w->lack & KENT_LACK_PIPE) {
        kent_notes_add(notes, "no restrained length: %s of the case%s",
                       w->fitting->point < 0 ? "this fitting stands in no pipe"
                                             : "the branch is no pipe",
                       joints && !h->held && !w->blocks_forbidden
                           ? "; write restraint = \"thrust-block\" in fittings"
                           : "");
    }
    if ((w->lack & KENT_LACK_SOIL) && !w->soil && w->fault == KENT_FAULT_NONE) {
        kent_notes_add(notes, "no restrained length: the soil is not stated");
    }
    if ((w->lack & KENT_LACK_SOIL) && kent_soil_counts(w->soil)) {
        kent_notes_add(notes, "no restrained length: it runs into ground whose soil is "
                              "not stated");
    }
    if (w->lack & KENT_LACK_SOUND) {
        kent_notes_add(notes, "no restrained length: it runs into ground that gives no "
                              "restraint, to the end of the pipe");
    }
    if ((w->lack & KENT_LACK_OLD_MAIN) && (!h->held || joints || both)) {
        kent_notes_add(
            notes, "restrained joints do not hold a tapping sleeve: the main that it "
                   "sits on lay there before, and its joints slip; use a thrust "
                   "block, or tie the main's joints first");
    }
    if (w->lack & KENT_LACK_PIECES) {
        kent_notes_add(notes,
                       "no restrained length: the ground changes more than %d times "
                       "along it, which is not worked out",
                       KENT_LEG_PIECES - 1);
    }
    notes->failed = notes->failed || t.failed;
    kent_text_clear(&t);
}

/* What a curve asks of the soil beside it, where that cannot give it. */
static void refuse_curve(const kent_holding_work *w, const kent_holding *h,
                         kent_text *t)
{
    const kent_system units = w->m->units;
    const bool level =
        w->demand.load[KENT_UPWARD] <= 0.0 && w->demand.load[KENT_DOWNWARD] <= 0.0;

    if (h->held) return;
    kent_text_add(t, "the curve presses on the soil beside it with %s factored, ",
                  kent_said_of(KENT_FORCE_PER_LENGTH, units, w->side_load).s);
    if (kent_holding_above_ground(w)) {
        kent_text_add(t, "and above ground no soil is beside it: guide it by a "
                         "structure made for that");
    } else if (kent_holding_in_casing(w)) {
        kent_text_add(t, "and in a casing no soil is beside it: end the casing before "
                         "it, or guide it there by a structure made for that");
    } else if (!level) {
        kent_text_add(t,
                      "and up or down too, which is not judged: weigh it against the "
                      "ground above, or make the turn with bends that are held");
    } else if (!w->soil) {
        kent_text_add(t, "and that soil is not stated; give ground.soil");
    } else if (!kent_soil_counts(w->soil)) {
        kent_text_add(
            t,
            "and that soil, '%s', gives nothing: replace it, or make the turn "
            "with bends on piles",
            w->soil->id);
    } else if (w->fault == KENT_FAULT_SLOPE) {
        kent_text_add(
            t,
            "and the ground beside it falls that way by %s, where these rules "
            "allow %s: level it, or make the turn with bends that are held",
            kent_said_of(KENT_ANGLE, units, w->site.falls).s,
            kent_said_of(KENT_ANGLE, units, w->m->rules.steepest_ground).s);
    } else if (w->fault == KENT_FAULT_FILL) {
        kent_text_add(t, "and the fill beside it is not stated, or bears nothing: give "
                         "ground.backfill a soil that does, compacted with its density "
                         "proved, or make the turn with bends that are held");
    } else if (isnan(h->utilisation)) {
        kent_text_add(t,
                      "and what that soil bears here is not known: give cover and what "
                      "the bearing of soil '%s' goes by",
                      w->soil->id);
    } else {
        kent_text_add(
            t,
            "%.2f of what it may bear: lay it to a radius of %s or more, or "
            "make the turn with bends that are held",
            h->utilisation,
            kent_said_of(KENT_LENGTH, units, w->fitting->curve_radius * h->utilisation)
                .s);
    }
}

/* Held one by one, each member has a thrust of its own, which can be held. */
static void refuse_couple(const kent_holding_work *w, kent_notes *notes)
{
    const double couple = w->couple.largest;

    if (!w->couple.apart) {
        kent_notes_add(
            notes,
            "no pipe joins all of these fittings, so that one may be under pressure "
            "without the others, and alone one pushes with %s factored, more than all "
            "together: no one block is sized for that. Leave together_with out, so "
            "that "
            "each is held by itself",
            kent_said_of(KENT_FORCE, w->m->units, w->alone).s);
        return;
    }
    kent_notes_add(
        notes,
        "the pushes of these fittings leave a couple of %s before any factor, and no "
        "force whose line meets them: no one block holds that. Write apart = true "
        "where they stand, and no together_with, so that each is held by itself",
        isnan(couple) ? "unknown size (no coordinates)"
                      : kent_said_of(KENT_MOMENT, w->m->units, couple).s);
}

void kent_holding_refuse(kent_holding_work *w, kent_holding *h)
{
    if (h->unbalanced) {
        refuse_couple(w, &h->cautions);
        return;
    }
    const bool joints = h->chosen == KENT_RESTRAINED_JOINTS;
    const bool both = h->chosen == KENT_BLOCK_AND_JOINTS;
    const bool soft = w->soil && !kent_soil_counts(w->soil);
    kent_text t = {0};

    if (h->soil_beside) {
        refuse_curve(w, h, &t);
    } else if (h->chosen == KENT_NO_RESTRAINT && w->fitting->role == KENT_ROLE_WALL) {
        kent_text_add(&t,
                      "the structure that the main is built into has to hold %s: it is "
                      "not designed here",
                      kent_said_of(KENT_FORCE, w->m->units, h->design_thrust).s);
    } else if (h->chosen == KENT_NO_RESTRAINT) {
        kent_text_add(&t, "restraint \"none\" is asked for: nothing holds %s",
                      kent_said_of(KENT_FORCE, w->m->units, h->design_thrust).s);
    } else if (joints && !h->held && soft) {
        refuse_soil(w, &t);
    } else if (joints && !h->held && h->leg_count == 0 && w->lack == 0) {
        kent_text_add(&t,
                      "no leg of this fitting has joints that could be restrained "
                      "against this push%s",
                      w->blocks_forbidden
                          ? ", and the rules forbid a block: hold it by a structure"
                          : ": write restraint = \"thrust-block\" for it in fittings");
    } else if (!joints) {
        refuse_block(w, h, &t);
    }
    if (t.length > 0) kent_notes_add(&h->cautions, "%s", kent_text_of(&t));
    h->cautions.failed = h->cautions.failed || t.failed;
    kent_text_clear(&t);

    refuse_lengths(w, h, joints || both || !h->held ? &h->cautions : &h->remarks);
    for (size_t i = 0; i < w->met.count && (joints || both || !h->held); i++) {
        kent_notes_add(&h->cautions, "%s", w->met.text[i]);
    }
}
