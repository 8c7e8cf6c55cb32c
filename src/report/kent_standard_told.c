#include "kent_standard_told.h"

#include "kent_said.h"
#include "kent_shown.h"
#include "kent_text.h"
#include "kent_told_rules.h"
#include "kent_view.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

kent_name kent_standard_fitting_name(const kent_standard *t, size_t fitting)
{
    kent_name name;
    const char *word = t->fittings[fitting];
    const char *degrees = strstr(word, " deg");
    const int kept = (int)(degrees ? (size_t)(degrees - word) : strlen(word));
    (void)snprintf(name.s, sizeof name.s, "%.*s%s", kept, word, degrees ? "°" : "");
    return name;
}

static const char *first_with(const kent_notes *notes, const char *start)
{
    for (size_t i = 0; i < notes->count; i++) {
        if (strncmp(notes->text[i], start, strlen(start)) == 0) return notes->text[i];
    }
    return NULL;
}

/* Ground in which nothing stands, told without the ways out that a real main has. */
static const char NO_GROUND[] = "this ground gives no restraint, neither to a block "
                                "nor to restrained joints: better "
                                "ground, piles, or joints carried into sound ground "
                                "need a calculation of their own";

static bool ground_counts(const kent_model *m)
{
    const kent_soil *s = &m->soils[m->ground.soil];
    return !s->unreliable &&
           !(s->route == KENT_BEARING_CONSTANT && s->allowable_bearing <= 0.0);
}

const char *kent_standard_no_block(const kent_standard_cell_result *c)
{
    const kent_notes *said = &c->holding.cautions;
    if (c->sized) return NULL;
    if (!ground_counts(c->model)) return NO_GROUND;
    return said->count > 0 ? said->text[0] : "no block holds it";
}

const char *kent_standard_no_length(const kent_standard_cell_result *c)
{
    static const char NONE[] = "no restrained length", ANY[] = "the restrained length";
    const kent_holding *h = &c->holding;
    const char *why = NULL;
    if (c->has_length) return NULL;
    if (!ground_counts(c->model)) return NO_GROUND;
    if (!why) why = first_with(&h->remarks, NONE);
    if (!why) why = first_with(&h->cautions, NONE);
    if (!why) why = first_with(&h->remarks, ANY);
    if (!why) why = first_with(&h->cautions, ANY);
    if (!why && h->cautions.count > 0) why = h->cautions.text[0];
    return why ? why : "no restrained length can be given";
}

/* ---- assumptions ----------------------------------------------------------------- */

/* What the parts share: the first cell's case stands for all that does not change. */
typedef struct teller {
    const kent_standard_result *r;
    const kent_standard *t;
    const kent_model *m;
    kent_system units;
    kent_notes *out;
} teller;

static void tell_area(const teller *w)
{
    const kent_joint joint = w->m->pipes[0].joint;
    const bool gasketed = joint == KENT_RESTRAINED || kent_joint_slips(joint);
    const char *on = "outside diameter of the pipe";
    switch (w->m->loads.thrust_area) {
    case KENT_AREA_OUTSIDE:
        break;
    case KENT_AREA_INSIDE:
        on = "bore of the pipe";
        break;
    case KENT_AREA_NOMINAL:
        on = "nominal size of the pipe";
        break;
    }
    if (gasketed && w->m->loads.thrust_area != KENT_AREA_OUTSIDE) {
        kent_notes_add(w->out,
                       "thrust: the pressure is taken to act on the %s, as thrust_area "
                       "says; %s joints seal on the outside diameter",
                       on, kent_joint_word(joint));
        return;
    }
    kent_notes_add(w->out, "thrust: the pressure acts on the %s, as %s joints seal",
                   gasketed ? on : "bore of the pipe", kent_joint_word(joint));
}

static void tell_pressure(const teller *w)
{
    kent_notes_add(
        w->out,
        "design pressure %s gauge in still water at every fitting: it has to be the "
        "highest that service, surge and test bring there",
        kent_said_of(KENT_PRESSURE, w->units, w->t->pressure).s);
    tell_area(w);
    kent_notes_add(
        w->out,
        "safety factor %.2f on the thrust, %s; beside each soil stands whether "
        "its bearing has a factor inside already",
        w->t->factor,
        isnan(w->m->loads.factor[KENT_CASE_STATIC]) ? "of the design rules"
                                                    : "as given");
}

static void tell_ground(const teller *w)
{
    const kent_ground *g = &w->m->ground;
    kent_text words = {0};
    kent_text_add(&words, "cover %s, ",
                  kent_said_of(KENT_LENGTH, w->units, g->cover).s);
    if (isinf(g->water_table)) {
        kent_text_add(&words, "no ground water");
    } else {
        kent_text_add(&words, "ground water %s below ground",
                      kent_said_of(KENT_LENGTH, w->units, g->water_table).s);
    }
    if (g->trench >= 0) {
        kent_text_add(&words, ", trench %s", kent_trench_word(g->trench));
    }
    kent_text_add(&words, ", pipes %s, faces against undisturbed ground",
                  g->wrapped ? "in polyethylene sleeves" : "bare");
    kent_notes_add(w->out, "%s", kent_text_of(&words));
    w->out->failed = w->out->failed || words.failed;
    kent_text_clear(&words);
}

/* A class or a lack of one is told among what is assumed. */
static void tell_concrete(const teller *w)
{
    const kent_concrete *c = &w->m->concrete;
    if (c->place.line == 0) return;
    kent_notes_add(w->out, "strength of concrete %s, as given",
                   kent_said_of(KENT_STRENGTH, w->units, c->strength).s);
}

static void tell_rules(const teller *w)
{
    const kent_rules *d = &w->m->rules;
    kent_text words = {0};
    kent_text_add(&words, "design rules '%s' (%s): ", d->id, d->source);
    kent_told_shape(d, w->units, &words);
    kent_told_asked(d, w->units, &words);
    kent_notes_add(w->out, "%s", kent_text_of(&words));
    w->out->failed = w->out->failed || words.failed;
    kent_text_clear(&words);
}

static void tell_fittings(const teller *w)
{
    static const struct {
        const char *word, *says;
    } SAYS[] = {
        {"tee", "tees have a branch of the size of the run, whose own hold is not "
                "counted"},
        {"wye", "wyes have a branch of the size of the run, whose own hold is not "
                "counted"},
        {"valve", "valves are shut and pressed from either side"},
        {"bend", "bends lie level"},
        {"crest", "crests have one leg level, and push up and along"},
        {"sag", "sags have one leg level, and push down and along"},
    };
    for (size_t i = 0; i < sizeof SAYS / sizeof SAYS[0]; i++) {
        const size_t n = strlen(SAYS[i].word);
        bool there = false;
        for (size_t k = 0; k < w->t->fitting_count; k++) {
            const char *word = w->t->fittings[k];
            there = there || strncmp(word, SAYS[i].word, n) == 0;
        }
        if (there) kent_notes_add(w->out, "%s", SAYS[i].says);
    }
}

static void tell_sizes(const teller *w)
{
    kent_text words = {0};
    kent_text_add(&words, "outside diameters: ");
    for (size_t i = 0; i < w->t->size_count; i++) {
        const size_t at = kent_standard_cell_index(w->t, 0, i, 0);
        const double outside = w->t->cells[at]->pipes[0].outside_diameter;
        kent_text_add(&words, "%s%s %s", i > 0 ? ", " : "", w->t->sizes[i],
                      kent_said_of(KENT_DIAMETER, w->units, outside).s);
        if (w->m->loads.thrust_area != KENT_AREA_NOMINAL) continue;
        const double nominal = w->t->cells[at]->pipes[0].nominal_size;
        kent_text_add(&words, " (nominal %s)",
                      kent_said_of(KENT_DIAMETER, w->units, nominal).s);
    }
    kent_notes_add(w->out, "%s", kent_text_of(&words));
    w->out->failed = w->out->failed || words.failed;
    kent_text_clear(&words);
}

/* What the cases assumed and cautioned of, each once. */
static void tell_assumed(const teller *w)
{
    const size_t cells = w->r->cell_count;
    for (size_t i = 0; i < cells; i++) {
        const kent_notes *n = &w->t->cells[i]->cautions;
        for (size_t k = 0; k < n->count; k++) {
            kent_notes_add(w->out, "%s", n->text[k]);
        }
    }
    for (size_t i = 0; i < cells; i++) {
        const kent_notes *n = &w->t->cells[i]->assumed;
        for (size_t k = 0; k < n->count; k++) {
            kent_text words = {0};
            kent_text_add(&words, "assumed: ");
            kent_shown_assumption(n->text[k], &words);
            kent_notes_add(w->out, "%s", kent_text_of(&words));
            w->out->failed = w->out->failed || words.failed;
            kent_text_clear(&words);
        }
    }
}

static void tell_ratings(const teller *w)
{
    for (size_t i = 0; i < w->r->cell_count; i++) {
        const kent_standard_cell_result *c = &w->r->cells[i];
        const size_t size = i / w->t->fitting_count % w->t->size_count;
        if (!c->over_rating) continue;
        kent_notes_add(w->out, "%s is rated for %s in service, less than this pressure",
                       w->t->sizes[size],
                       kent_said_of(KENT_PRESSURE, w->units, c->rating).s);
    }
}

void kent_standard_assumptions(const kent_standard_result *r, kent_system units,
                               kent_notes *out)
{
    const teller w = {
        .r = r, .t = r->table, .m = r->cells[0].model, .units = units, .out = out};
    tell_pressure(&w);
    tell_ground(&w);
    tell_concrete(&w);
    tell_rules(&w);
    tell_fittings(&w);
    tell_sizes(&w);
    tell_ratings(&w);
    tell_assumed(&w);
    kent_notes_add(
        out, "holds only for these sizes, fittings and soils, up to this pressure, at "
             "this cover and with ground water no higher: do not extrapolate. Other "
             "sizes or soils, less cover, more pressure, ground that falls away, or a "
             "trench, structure or main in the ground that a block leans on need a "
             "calculation of their own");
}
