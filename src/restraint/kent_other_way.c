#include "kent_holding_internal.h"
#include "kent_said.h"

static const double PI = 3.14159265358979323846;

/* rad: cases that push no farther apart push one way. A face that leans into the push
 * so much bears 0.7 of it square on. Common practice, no source. */
static const double ONE_WAY = 0.25 * PI;
/* Share of what governs: suction presses joints together, and less of it is left to the
 * fill beside the pipe and its friction. Common practice, no source. */
static const double SLIGHT = 0.1;
/* Loads nearer than this, relative, are a tie. */
static const double TIE = 1e-12;

/* rad between two level directions, 0 .. pi. */
static double turned_between(kent_vec3 a, kent_vec3 b)
{
    const double along = a.x * b.x + a.y * b.y, across = a.x * b.y - a.y * b.x;
    return fabs(atan2(across, along));
}

static kent_vec3 sideways_thrust(const kent_load_case *c)
{
    return kent_instant_lasting(&c->worst[KENT_SIDEWAYS]);
}

bool kent_one_way(const kent_load_case *a, const kent_load_case *b)
{
    if (!a->worst[KENT_SIDEWAYS].set || !b->worst[KENT_SIDEWAYS].set) return false;
    return turned_between(sideways_thrust(a), sideways_thrust(b)) <=
           ONE_WAY * (1.0 + TIE);
}

/* ---- which ways ------------------------------------------------------------------ */

/* Whether a push is borne already: by what governs, or a way found before. */
static bool is_known(const kent_holding *h, kent_vec3 governs, kent_vec3 push)
{
    const double limit = ONE_WAY * (1.0 + 1e-9);

    if (turned_between(governs, push) <= limit) return true;
    for (size_t i = 0; i < h->other_way_count; i++) {
        if (turned_between(h->other_ways[i].thrust, push) <= limit) return true;
    }
    return false;
}

/* More than the best so far; of equals the case called suction tells more. */
static bool goes_before(const kent_holding_work *w, const kent_other_way *way,
                        const kent_other_way *best)
{
    if (best->load_case < 0) return true;
    const bool named = w->loads->cases[way->load_case].kind == KENT_CASE_SUCTION &&
                       w->loads->cases[best->load_case].kind != KENT_CASE_SUCTION;
    return way->load > best->load * (1.0 + TIE) ||
           (named && way->load >= best->load * (1.0 - TIE));
}

/* The largest push that goes another way than all found so far. */
static kent_other_way next_way(const kent_holding_work *w, const kent_holding *h,
                               kent_vec3 governs)
{
    kent_other_way best = {.load_case = -1};

    for (size_t i = 0; i < w->loads->count; i++) {
        const kent_load_case *c = &w->loads->cases[i];
        const kent_instant *at[] = {&c->lowest, &c->highest, &c->worst[KENT_SIDEWAYS]};
        for (size_t k = 0; k < sizeof at / sizeof at[0]; k++) {
            if (!at[k]->set) continue;
            const kent_vec3 thrust = kent_instant_lasting(at[k]);
            const double sideways = kent_thrust_horizontal(thrust);
            kent_other_way way = {
                .load_case = (int)i,
                .thrust = thrust,
                .sideways = sideways,
                .load = c->safety_factor * sideways,
                .time = at[k]->time,
                .turned = turned_between(governs, thrust),
                .friction = NAN,
            };
            way.slight = at[k]->pressure < 0.0 &&
                         way.load <= SLIGHT * w->factored[KENT_SIDEWAYS];
            if (!(sideways >= KENT_HOLDING_LEAST)) continue;
            if (is_known(h, governs, thrust)) continue;
            if (goes_before(w, &way, &best)) best = way;
        }
    }
    return best;
}

/* source docs/theory/09-load-cases.md, 9.19 */
void kent_other_ways_find(kent_holding_work *w, kent_holding *h)
{
    const int sideways = h->by_sense[KENT_SIDEWAYS];

    if (sideways < 0) return;
    const kent_vec3 governs = sideways_thrust(&w->loads->cases[sideways]);
    while (h->other_way_count < KENT_OTHER_WAYS) {
        const kent_other_way way = next_way(w, h, governs);
        if (way.load_case < 0) break;
        h->other_ways[h->other_way_count++] = way;
    }
    /* the pipes of the legs pass through its sides */
    w->site.all_round =
        h->other_way_count > 0 && kent_fitting_has_shut_legs(w->m, w->fitting);
    if (w->site.all_round && w->site.hole == 0.0) {
        w->site.hole = 0.25 * PI * w->site.diameter * w->site.diameter;
    }
}

/* ---- what takes them ------------------------------------------------------------- */

/* N: the block's concrete as it weighs where it stands, its face's apart. */
static double block_weight(const kent_holding_work *w, const kent_block *b)
{
    const kent_site *site = &w->site;
    const bool base = b->type == KENT_BLOCK_BASE;
    const double axis = kent_site_axis(site);
    const double deepest =
        base ? axis + 0.5 * site->diameter + b->thickness : axis + 0.5 * b->height;
    const double hole = b->type == KENT_BLOCK_BEARING ? site->hole * b->thickness : 0.0;

    return (b->volume - hole) * kent_site_concrete(site, &w->m->rules, deepest);
}

/* N on the block's base, less what lifts it in the same instant, factored; NAN: the
 * soil's friction is not known. source docs/theory/09-load-cases.md, 9.20 */
static double block_friction(const kent_holding_work *w, const kent_holding *h,
                             const kent_other_way *way)
{
    const kent_load_case *c = &w->loads->cases[way->load_case];
    const double lifted = c->safety_factor * fmax(0.0, way->thrust.z);
    const double rests = fmax(0.0, block_weight(w, &h->block) - lifted);

    return w->soil ? w->soil->base_friction * rests : NAN;
}

static kent_taken taken_by_block(const kent_holding_work *w, const kent_holding *h,
                                 const kent_other_way *way)
{
    const bool both = w->site.hole > 0.0 || h->chosen == KENT_ANCHOR_BLOCK;
    const bool back = way->turned >= PI - ONE_WAY * (1.0 + 1e-9);

    if (w->site.all_round || (both && back)) return KENT_TAKEN_BY_FACE;
    return way->friction >= way->load ? KENT_TAKEN_BY_FRICTION : KENT_TAKEN_BY_NOTHING;
}

/* Of two systems: whether the joints' part of what they are made for is as much. */
static bool taken_by_joints(const kent_holding_work *w, const kent_holding *h,
                            const kent_other_way *way)
{
    return h->chosen == KENT_BLOCK_AND_JOINTS &&
           way->load <= h->joints_share * w->factored[KENT_RESULTANT] * (1.0 + TIE);
}

void kent_other_ways_take(const kent_holding_work *w, kent_holding *h)
{
    for (size_t i = 0; i < h->other_way_count; i++) {
        kent_other_way *way = &h->other_ways[i];
        if (!h->held) continue;
        if (h->soil_beside) {
            way->taken = KENT_TAKEN_BY_FACE; /* of the trench's other side */
        } else if (h->chosen == KENT_RESTRAINED_JOINTS) {
            way->taken = KENT_TAKEN_BY_JOINTS; /* of all legs where legs can be shut */
        } else if (h->block.type != KENT_BLOCK_NONE) {
            way->friction = block_friction(w, h, way);
            way->taken = taken_by_joints(w, h, way) ? KENT_TAKEN_BY_JOINTS
                                                    : taken_by_block(w, h, way);
        }
    }
}

bool kent_other_way_bars(const kent_other_way *way)
{
    return way->taken == KENT_TAKEN_BY_NOTHING && !way->slight;
}

void kent_other_ways_judge(kent_holding_work *w, kent_holding *h)
{
    for (size_t i = 0; i < h->other_way_count && h->held; i++) {
        if (!kent_other_way_bars(&h->other_ways[i])) continue;
        const double area = h->block.bearing_area;
        w->fault = KENT_FAULT_OTHER_WAY;
        w->barred = &h->other_ways[i];
        h->held = false;
        h->block = kent_block_none();
        h->block.bearing_area = area;
        h->stability = (kent_stability){0};
        h->utilisation = NAN;
        h->factor_reached = NAN;
    }
}

/* ---- saying it ------------------------------------------------------------------- */

static kent_said force(const kent_holding_work *w, double value)
{
    return kent_said_of(KENT_FORCE, w->m->units, value);
}

static bool pulls_back(const kent_other_way *way)
{
    return way->turned >= PI - ONE_WAY * (1.0 + 1e-9);
}

/* What would take a push that the face does not bear. */
static void add_remedy(const kent_holding_work *w, const kent_holding *h,
                       const kent_other_way *way, kent_text *t)
{
    const kent_load_case *c = &w->loads->cases[way->load_case];

    if (isnan(way->friction) || !(w->soil->base_friction > 0.0)) {
        kent_text_add(t, "give base_friction of the soil, to have the block's own "
                         "weight judged");
    } else {
        const double lifted = c->safety_factor * fmax(0.0, way->thrust.z);
        kent_text_add(t,
                      "the block's weight takes %s of the %s that it asks for; tie the "
                      "fitting by straps or rods to one that weighs %s where it stands",
                      force(w, way->friction).s, force(w, way->load).s,
                      force(w, way->load / w->soil->base_friction + lifted).s);
    }
    if (pulls_back(way) && h->chosen != KENT_ANCHOR_BLOCK) {
        kent_text_add(t, ", or write restraint = \"anchor-block\", which bears on both "
                         "its sides");
    }
}

static void add_way(const kent_holding_work *w, const kent_other_way *way, kent_text *t)
{
    kent_text_add(t, "'%s' pulls %s, with %s sideways before any factor",
                  w->loads->cases[way->load_case].title.s,
                  pulls_back(way) ? "the other way" : "another way",
                  force(w, way->sideways).s);
}

void kent_other_way_refuse(const kent_holding_work *w, const kent_holding *h,
                           kent_text *t)
{
    kent_text_add(t, "no block: ");
    add_way(w, w->barred, t);
    kent_text_add(t, ", and its face does not bear that way; ");
    add_remedy(w, h, w->barred, t);
}

static void say_way(const kent_holding_work *w, kent_holding *h,
                    const kent_other_way *way)
{
    kent_text t = {0};

    add_way(w, way, &t);
    switch (way->taken) {
    case KENT_TAKEN_BY_FRICTION:
        kent_text_add(
            &t,
            ": the block's weight takes it on its base, %s of friction against "
            "%s factored, once straps or rods tie the fitting to it",
            force(w, way->friction).s, force(w, way->load).s);
        break;
    case KENT_TAKEN_BY_NOTHING: /* slight: else it is refused */
        kent_text_add(&t, ", and the face does not bear that way: so little is left to "
                          "the fill beside the pipe, unless straps or rods tie the "
                          "fitting to a block that holds it");
        break;
    case KENT_TAKEN_BY_FACE:
    case KENT_TAKEN_BY_JOINTS:
        break;
    }
    kent_notes_add(&h->cautions, "%s", kent_text_of(&t));
    h->cautions.failed = h->cautions.failed || t.failed;
    kent_text_clear(&t);
}

/* Each leg that can be shut turns the thrust; a block bears on all its sides then. */
static void say_shut_legs(const kent_holding_work *w, kent_holding *h)
{
    const kent_other_way *way = &h->other_ways[0];
    const char *name = w->loads->cases[way->load_case].title.s;

    if (h->chosen == KENT_RESTRAINED_JOINTS) return; /* each leg is restrained */
    kent_notes_add(
        &h->cautions,
        "its legs can be shut one by one, and '%s' pushes another way, with "
        "%s sideways before any factor: the block is as thick as its face is "
        "wide, and every side must reach undisturbed ground beside the "
        "trenches",
        name, force(w, way->sideways).s);
}

/* A cross or wye whose legs are said not to close is taken as balanced. */
static void say_balanced(const kent_holding_work *w, kent_holding *h)
{
    const kent_fitting *f = w->fitting;
    const bool cross = f->type == KENT_CROSS || f->type == KENT_WYE;

    if (!cross || f->point < 0 || !f->stated.closes_stated) return;
    if (f->stated.closes_count >= f->port_count) return;
    kent_notes_add(
        &h->cautions,
        "%s of this %s can be shut, as can_close says: it is balanced only while "
        "the others are under pressure, all at once and for good",
        f->stated.closes_count == 0 ? "no leg" : "not every leg",
        kent_fitting_type_word(f->type));
}

/* For the hand calculation alone: what an empty pipe does not do. */
static void remark_empty(const kent_holding_work *w, kent_holding *h)
{
    const kent_fitting *f = w->fitting;
    const bool branch = f->type == KENT_TEE && f->port_count == 3;

    if (h->needs_nothing || f->point < 0) return;
    if (branch) {
        kent_notes_add(&h->remarks,
                       "its branch alone under pressure, with the run shut off and "
                       "empty, pushes as much: nothing is counted on from pipes that "
                       "are empty, which can be pushed together");
    } else if (f->type == KENT_VALVE && f->port_count == 2) {
        kent_notes_add(&h->remarks,
                       "nothing is counted on from the pipe behind it, which may be "
                       "empty and can be pushed together");
    }
}

void kent_other_ways_caution(const kent_holding_work *w, kent_holding *h)
{
    say_balanced(w, h);
    remark_empty(w, h);
    if (!h->held || h->other_way_count == 0 || h->soil_beside) return;
    if (kent_fitting_has_shut_legs(w->m, w->fitting)) {
        say_shut_legs(w, h);
        return;
    }
    for (size_t i = 0; i < h->other_way_count; i++) {
        const kent_taken by = h->other_ways[i].taken;
        const bool bears = by == KENT_TAKEN_BY_FACE || by == KENT_TAKEN_BY_JOINTS;
        if (!bears) say_way(w, h, &h->other_ways[i]);
    }
}
