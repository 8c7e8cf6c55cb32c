#include "kent_as_built_internal.h"
#include "kent_said.h"
#include "kent_stability_internal.h"

#include <stdlib.h>
#include <string.h>

/* A factor found to this share of itself. */
static const double CLOSE = 1e-12;

/* A factor that nobody builds to: a leg that reaches it needs no other told. */
static const double HIGHEST = 1e4;

double kent_built_share(double height, double e)
{
    return fmax(0.0, 1.0 - 2.0 * fabs(e) / height);
}

void kent_as_built_clear(kent_as_built *b)
{
    free(b->reaches);
    kent_notes_clear(&b->broken);
    *b = (kent_as_built){0};
}

/* ---- reaches --------------------------------------------------------------------- */

static void built_add(kent_as_built *b, kent_built_reach reach)
{
    reach.reached = reach.resistance / reach.load;
    reach.utilisation = reach.asked / reach.reached;
    if (kent_grow((void **)&b->reaches, &b->capacity, b->count + 1,
                  sizeof *b->reaches) != 0) {
        b->broken.failed = true;
        return;
    }
    b->reaches[b->count] = reach;
    const bool unknown = isnan(reach.utilisation);
    if (unknown || reach.utilisation > 1.0 + CLOSE) b->falls_short = true;
    if (!unknown &&
        (b->worst < 0 || reach.utilisation > b->reaches[b->worst].utilisation)) {
        b->worst = (int)b->count;
    }
    b->count++;
}

/* Whether a case pushes in a sense hard enough to count beside the largest of all. */
static bool counts(const kent_holding_work *w, const kent_load_case *c,
                   kent_sense sense)
{
    const double part = c->safety_factor * kent_holding_part(c, sense);
    return part > KENT_BLOCK_NEGLIGIBLE * w->factored[KENT_RESULTANT];
}

/* ---- a block --------------------------------------------------------------------- */

static double or_zero(double value) { return isnan(value) ? 0.0 : value; }

/* The block as it was built, in the shape that sizes one. */
static kent_block built_block(const kent_holding_work *w, const kent_built *built,
                              kent_block_type type)
{
    const bool own = type == KENT_BLOCK_BEARING;
    kent_block b = kent_block_none();
    b.type = type;
    b.width = built->width;
    b.height = built->height;
    b.thickness = built->thickness;
    b.volume = b.width * b.height * b.thickness;
    b.face = own ? (kent_face){b.width, b.height}
                 : (kent_face){built->face_width, built->face_height};
    b.face_thickness = own ? b.thickness : built->face_thickness;
    b.has_face = !own && built->face_width > 0.0;
    if (b.has_face) {
        b.face_volume = b.face.width * b.face.height * b.face_thickness;
    } else if (type == KENT_BLOCK_GRAVITY) {
        b.has_face = b.own_side = kent_block_side_bears(&w->m->rules, &w->site, &b);
    }
    const double deep =
        own || type == KENT_BLOCK_GRAVITY ? 0.5 * b.height : b.thickness;
    const double base = kent_site_axis(&w->site) + or_zero(built->axis_above) + deep;
    b.submerged = kent_site_concrete(&w->site, &w->m->rules, base) <
                  w->m->rules.concrete_unit_weight;
    return b;
}

/* N that the block holds in one sense; 0: it has no part for it; NAN: not known. */
static double block_holds(const kent_holding_work *w, const kent_block *block,
                          const kent_site *site, kent_sense sense)
{
    kent_demand one = {{0.0}};
    double use[KENT_SENSES];
    if (sense == KENT_SIDEWAYS && !(block->face.width > 0.0)) return 0.0;
    one.load[sense] = 1.0;
    kent_block_use(block, &w->m->rules, site, &one, use);
    return 1.0 / use[sense];
}

/* The part of the thrust that is the block's. */
static double block_part(const kent_holding *h)
{
    const bool shared = h->chosen == KENT_BLOCK_AND_JOINTS;
    return shared && h->block_share > 0.0 ? h->block_share : 1.0;
}

/* A face whose middle is off the axis stands at another depth, and bears on less. */
static void built_face(const kent_holding_work *w, const kent_built *built,
                       kent_block *block, kent_site *site)
{
    const double e = or_zero(built->axis_above);
    const double bears = w->site.allowable;
    if (!(fabs(e) > 0.0)) return;
    block->face.height *= kent_built_share(block->face.height, e);
    site->cover += e;
    kent_site_bear(site, &w->m->rules);
    site->allowable = fmin(site->allowable, bears); /* deeper ground is no credit */
    site->cover = w->site.cover;
}

/* Whether the face bears a case: one way only, that of what governs sideways. */
static bool faces(const kent_holding_work *w, const kent_holding *h,
                  const kent_load_case *c)
{
    const int governing = h->by_sense[KENT_SIDEWAYS];
    return governing < 0 || c == &w->loads->cases[governing] ||
           kent_one_way(&w->loads->cases[governing], c);
}

/* What pushes other ways, and what of the block that was built takes it. */
static void built_other_ways(const kent_holding_work *w, kent_holding *h,
                             const kent_block *block)
{
    static const char *const TAKES[] = {
        [KENT_TAKEN_BY_NOTHING] = "nothing that was built takes it",
        [KENT_TAKEN_BY_FACE] = "another side of the block takes it, where that stands "
                               "against undisturbed ground",
        [KENT_TAKEN_BY_FRICTION] = "the block's weight takes it, once the fitting is "
                                   "tied to it",
        [KENT_TAKEN_BY_JOINTS] = "the restrained joints take it",
    };
    kent_holding built = *h;
    built.block = *block;
    built.held = true;
    kent_other_ways_take(w, &built);
    for (size_t i = 0; i < built.other_way_count; i++) {
        const kent_other_way *way = &built.other_ways[i];
        kent_notes_add(
            &h->as_built.broken,
            "'%s' pushes another way than the face bears, by %s factored: %s",
            w->loads->cases[way->load_case].title.s,
            kent_said_of(KENT_FORCE, w->m->units, way->load).s, TAKES[way->taken]);
        if (kent_other_way_bars(way)) h->as_built.falls_short = true;
    }
}

static void built_blocks_reach(const kent_holding_work *w, kent_holding *h,
                               const kent_built *built, kent_block block)
{
    kent_site site = w->site;
    const bool ground = kent_soil_counts(w->soil);
    built_face(w, built, &block, &site);
    for (size_t i = 0; i < w->loads->count; i++) {
        const kent_load_case *c = &w->loads->cases[i];
        for (kent_sense s = KENT_SIDEWAYS; s <= KENT_DOWNWARD; s++) {
            const double increase =
                s == KENT_UPWARD || !(c->increase > 1.0) ? 1.0 : c->increase;
            const double holds = block_holds(w, &block, &site, s);
            const bool leans = s != KENT_UPWARD;
            if (!counts(w, c, s) || (s == KENT_SIDEWAYS && !faces(w, h, c))) continue;
            built_add(&h->as_built,
                      (kent_built_reach){
                          .port = -1,
                          .load_case = (int)i,
                          .sense = s,
                          .load = block_part(h) * kent_holding_part(c, s),
                          .resistance = leans && !ground ? 0.0 : increase * holds,
                          .asked = c->safety_factor,
                      });
        }
    }
}

/* Whether the body that was built stays in place, by the factors that the rules ask.
 * Of a bearing block without a thickness its face alone tells, which is told above. */
static void built_stands(const kent_holding_work *w, kent_holding *h,
                         const kent_built *built, const kent_block *block)
{
    kent_holding_work work = *w; /* to be asked of another block */
    kent_block face = *block;
    kent_stability s;
    char words[96];

    if (h->needs_nothing) return;
    if (isnan(block->volume)) {
        if (block->type == KENT_BLOCK_BEARING) return;
        kent_notes_add(&h->as_built.broken,
                       "whether the block stays in place is not told: give its width, "
                       "height and thickness");
        h->as_built.falls_short = true;
        return;
    }
    built_face(w, built, &face, &work.site);
    kent_stability_find(&work, h, block, or_zero(built->axis_above), &s);
    if (s.stands) return;
    kent_stability_says(&s, words, sizeof words);
    kent_notes_add(&h->as_built.broken, "the block does not stay in place: %s", words);
    h->as_built.falls_short = true;
}

/* What was built, where the case does not say: what was designed, else a bearing block.
 */
static kent_block_type built_type(const kent_holding *h, const kent_built *built)
{
    if (built->body >= 0) return (kent_block_type)built->body;
    if (isnan(built->width) && isnan(built->height)) return KENT_BLOCK_NONE;
    return h->block.type != KENT_BLOCK_NONE ? h->block.type : KENT_BLOCK_BEARING;
}

static void find_block(const kent_holding_work *w, kent_holding *h,
                       const kent_built *built)
{
    const kent_block_type type = built_type(h, built);
    if (type == KENT_BLOCK_NONE) return;
    const kent_block block = built_block(w, built, type);
    h->as_built.volume = block.volume + block.face_volume;
    built_blocks_reach(w, h, built, block);
    built_stands(w, h, built, &block);
    built_other_ways(w, h, &block);
    if (!kent_as_built_judge(w, h, built, &block, &h->as_built.broken)) {
        h->as_built.falls_short = true;
    }
}

/* ---- legs ------------------------------------------------------------------------ */

/* m that a leg needs for a factor; INFINITY where no length does; NAN: not known. */
static double leg_needs(const kent_holding_work *w, size_t port, kent_vec3 thrust,
                        double factor)
{
    static const unsigned NO_END = KENT_LACK_GRIP | KENT_LACK_SOUND;
    kent_leg_work work;
    const unsigned lack =
        kent_leg_prepare(w->m, w->standings, w->index, port, thrust, factor, &work);
    if (lack == 0) return work.length;
    return (lack & ~NO_END) == 0 ? (double)INFINITY : (double)NAN;
}

/* -: the factor whose length is the one built. A length grows with its factor, so it is
 * closed in on from both sides. NAN: what a leg holds is not known. source 25.3 */
static double leg_reaches(const kent_holding_work *w, size_t port, kent_vec3 thrust,
                          double length)
{
    double low = 0.0, high = 1.0;
    if (!(length > 0.0)) return 0.0;
    if (isinf(length)) return INFINITY;
    if (isnan(leg_needs(w, port, thrust, high))) return NAN;
    while (high < HIGHEST && leg_needs(w, port, thrust, high) <= length) {
        low = high;
        high *= 2.0;
    }
    while (high - low > CLOSE * high) {
        const double middle = 0.5 * (low + high);
        if (!(middle > low && middle < high)) break; /* next to each other */
        if (leg_needs(w, port, thrust, middle) <= length) {
            low = middle;
        } else {
            high = middle;
        }
    }
    return low;
}

/* Of a leg that stands; else -1. */
static int port_toward(const kent_holding_work *w, int toward)
{
    for (size_t k = 0; k < w->fitting->port_count; k++) {
        const kent_port *p = &w->m->ports[w->fitting->port_first + k];
        if (p->toward == toward && p->span >= 0) return (int)k;
    }
    return -1;
}

static double built_length(const kent_holding_work *w, const kent_built *built,
                           size_t port)
{
    for (size_t i = 0; i < built->leg_count; i++) {
        const kent_built_leg *leg = &w->m->built_legs[built->leg_first + i];
        if (port_toward(w, leg->toward) == (int)port) return leg->length;
    }
    return 0.0;
}

/* The part of the thrust that is the joints'. */
static double joints_part(const kent_holding *h)
{
    const bool shared = h->chosen == KENT_BLOCK_AND_JOINTS;
    return shared && h->joints_share > 0.0 ? h->joints_share : 1.0;
}

/* m of a built leg that count: up to what breaks it; INFINITY where it ends in a
 * structure, which takes what is left. */
static double leg_counts(const kent_holding_work *w, size_t port, double length,
                         kent_notes *notes)
{
    const kent_port *p = &w->m->ports[w->fitting->port_first + port];
    kent_leg_work work;
    if (!(length > 0.0)) return 0.0;
    (void)kent_leg_prepare(w->m, w->standings, w->index, port, w->pull, w->pull_factor,
                           &work);
    const kent_leg_walk walk =
        kent_leg_walk_of(w->m, w->standings, w->index, p, length, work.own);
    if (walk.end == KENT_LEG_AT_STRUCTURE) {
        kent_notes_add(notes,
                       "the restrained leg ends at the structure at %s: it holds what "
                       "that structure holds, which is not told here",
                       w->m->fittings[walk.fitting].id);
        return INFINITY;
    }
    if (walk.reach < length - KENT_SAME_PLACE) {
        kent_notes_add(notes,
                       "of %s restrained %s count: something breaks the leg there",
                       kent_said_of(KENT_LENGTH, w->m->units, length).s,
                       kent_said_of(KENT_LENGTH, w->m->units, walk.reach).s);
    }
    return fmin(length, walk.reach);
}

static void find_leg(const kent_holding_work *w, kent_holding *h,
                     const kent_built *built, size_t port)
{
    const double length =
        leg_counts(w, port, built_length(w, built, port), &h->as_built.broken);
    for (size_t i = 0; i < w->loads->count; i++) {
        const kent_load_case *c = &w->loads->cases[i];
        const double part = joints_part(h);
        const double load = part * kent_holding_part(c, KENT_RESULTANT);
        if (!(load >= KENT_HOLDING_LEAST)) continue;
        const kent_vec3 thrust =
            kent_vec3_scale(part, kent_instant_lasting(&c->worst[KENT_RESULTANT]));
        built_add(&h->as_built,
                  (kent_built_reach){
                      .port = (int)port,
                      .load_case = (int)i,
                      .sense = KENT_RESULTANT,
                      .load = load,
                      .resistance = load * leg_reaches(w, port, thrust, length),
                      .asked = c->safety_factor,
                  });
    }
}

/* Of a fitting that one leg alone can hold, those legs that were built; else all that
 * it has, for a leg that was left out holds nothing. */
static void find_legs(const kent_holding_work *w, kent_holding *h,
                      const kent_built *built)
{
    const kent_leg_rule *rule = kent_leg_rule_of(w->m, w->fitting);
    const size_t ports = w->fitting->port_count;
    const size_t end =
        rule->first + rule->count < ports ? rule->first + rule->count : ports;
    if (built->leg_count == 0) return;
    for (size_t k = rule->first; k < end; k++) {
        if (rule->either && !(built_length(w, built, k) > 0.0)) continue;
        find_leg(w, h, built, k);
    }
}

/* ---- all ------------------------------------------------------------------------- */

static const kent_built *built_of(const kent_holding_work *w)
{
    for (size_t i = 0; i < w->m->built_count; i++) {
        if (strcmp(w->m->built[i].fitting, w->fitting->id) == 0) {
            return &w->m->built[i];
        }
    }
    return NULL;
}

void kent_as_built_find(const kent_holding_work *w, kent_holding *h)
{
    const kent_built *built = built_of(w);
    h->as_built = (kent_as_built){.worst = -1, .volume = NAN};
    if (!built) return;
    h->as_built.stated = true;
    if (h->unbalanced) {
        h->as_built.falls_short = true;
        kent_notes_add(&h->as_built.broken,
                       "what holds these fittings as one leaves a couple, so that no "
                       "factor of one block is told");
        return;
    }
    find_block(w, h, built);
    find_legs(w, h, built);
    if (h->as_built.count == 0 && !h->needs_nothing) {
        h->as_built.falls_short = true;
        kent_notes_add(&h->as_built.broken,
                       "neither a block nor a restrained leg is stated as built");
    }
}
