#include "kent_shown.h"
#include "kent_sink.h"
#include "kent_suter.h"
#include "kent_table.h"
#include "kent_told_rules.h"

#include <math.h>
#include <string.h>

static bool is_digit(char c) { return c >= '0' && c <= '9'; }

/* What the parts of one listing share. */
typedef struct kent_listing {
    const kent_catalogue *catalogue;
    const kent_choice *choice;
    size_t *rows; /* listed so far */
    kent_system units;
    size_t limit;        /* columns of a line; 0: none */
    kent_notes *sources; /* of the part being listed, in order of first mention */
    kent_text *out;
} kent_listing;

/* Whether a text holds a word, its numbers whole: "DN100" is not in "DN1000", nor
 * "8in" in "48in", nor "DR32" in "DR32.5". */
static bool has_word(const char *text, const char *word)
{
    const size_t length = strlen(word);
    for (const char *at = text; length > 0 && (at = strcasestr(at, word)); at++) {
        const char *end = at + length;
        const bool cut_before =
            at > text && is_digit(at[0]) && (is_digit(at[-1]) || at[-1] == '.');
        const bool cut_after =
            is_digit(end[-1]) &&
            (is_digit(end[0]) || (end[0] == '.' && is_digit(end[1])));
        if (!cut_before && !cut_after) return true;
    }
    return length == 0;
}

/* Whether a row is asked for by its words; counts it then. */
static bool wanted(const kent_listing *l, const char *id, const char *material,
                   const char *standard, const char *source, const char *status)
{
    const char *const texts[] = {id, material, standard, source, status};
    for (size_t i = 0; i < l->choice->word_count; i++) {
        bool found = false;
        for (size_t k = 0; k < sizeof texts / sizeof texts[0]; k++) {
            found = found || has_word(texts[k], l->choice->words[i]);
        }
        if (!found) return false;
    }
    ++*l->rows;
    return true;
}

static void quantity(const kent_listing *l, kent_table *t, kent_kind kind, double si)
{
    kent_table_cell(t, "%s", kent_shown_quantity(kind, l->units, si).text);
}

static void number(kent_table *t, double value, int decimals)
{
    kent_table_cell(t, "%s", kent_shown_number(value, decimals).text);
}

/* Millimetres and inches of a wall need more decimals than those of a bore. */
static void wall(const kent_listing *l, kent_table *t, double si)
{
    number(t, kent_units_shown(KENT_DIAMETER, l->units, si),
           l->units == KENT_SI ? 1 : 3);
}

/* The source's number; sources are too long for a column and stand under the table. */
static void source(const kent_listing *l, kent_table *t, const char *text)
{
    kent_notes_add(l->sources, "%s", text);
    for (size_t i = 0; i < l->sources->count; i++) {
        if (strcmp(l->sources->text[i], text) != 0) continue;
        kent_table_cell(t, "[%zu]", i + 1);
        return;
    }
    l->out->failed = true; /* the note was lost for want of memory */
}

static void origin(const kent_listing *l, kent_table *t, const kent_provenance *from)
{
    kent_table_cell(t, "%s", from->status);
    source(l, t, from->source);
}

static void print_sources(const kent_listing *l)
{
    for (size_t i = 0; i < l->sources->count; i++) {
        char lead[32];
        (void)snprintf(lead, sizeof lead, "[%zu] ", i + 1);
        kent_table_paragraph(l->out, l->limit, lead, l->sources->text[i]);
    }
    kent_notes_clear(l->sources);
}

static void finish(const kent_listing *l, const char *heading, kent_table *t)
{
    if (t->cell_count == 0) { /* no row is asked for */
        kent_table_clear(t);
        return;
    }
    kent_text_add(l->out, "%s%s\n", l->out->length > 0 ? "\n" : "", heading);
    (void)kent_table_print(t, l->limit, l->out);
    kent_table_clear(t);
    print_sources(l);
}

static void list_pipes(const kent_listing *l)
{
    const kent_shown mm = kent_shown_unit(KENT_DIAMETER, l->units);
    const kent_shown bar = kent_shown_unit(KENT_PRESSURE, l->units);
    const kent_column columns[] = {
        {"pipe_class", "", KENT_ALIGN_LEFT, false},
        {"material", "", KENT_ALIGN_LEFT, true},
        {"outside", mm.text, KENT_ALIGN_RIGHT, false},
        {"wall", mm.text, KENT_ALIGN_RIGHT, false},
        {"least", mm.text, KENT_ALIGN_RIGHT, false},
        {"lining", mm.text, KENT_ALIGN_RIGHT, false},
        {"service", bar.text, KENT_ALIGN_RIGHT, false},
        {"surge", bar.text, KENT_ALIGN_RIGHT, false},
        {"test", bar.text, KENT_ALIGN_RIGHT, false},
        {"status", "", KENT_ALIGN_LEFT, false},
        {"source", "", KENT_ALIGN_LEFT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < l->catalogue->pipe_count; i++) {
        const kent_pipe_class *p = &l->catalogue->pipes[i];
        if (!wanted(l, p->id, p->material, p->standard, p->from.source,
                    p->from.status)) {
            continue;
        }
        kent_table_cell(&t, "%s", p->id);
        kent_table_cell(&t, "%s", p->material);
        wall(l, &t, p->outside_diameter);
        wall(l, &t, p->wall);
        wall(l, &t, p->wall_minimum);
        wall(l, &t, p->lining > 0.0 ? p->lining : NAN);
        quantity(l, &t, KENT_PRESSURE, p->pressure_rating);
        quantity(l, &t, KENT_PRESSURE, p->surge_rating);
        quantity(l, &t, KENT_PRESSURE, p->test_rating);
        origin(l, &t, &p->from);
    }
    finish(l,
           "Pipes: walls nominal and least, pressures rated in service, with surge now "
           "and then, under test",
           &t);
}

/* "70 °C": above it the material is not for use; a dash where nothing is known. */
static void warmest(const kent_listing *l, kent_table *t, const kent_material *m)
{
    quantity(l, t, KENT_TEMPERATURE,
             m->derating_count > 0 ? m->derating[m->derating_count - 1].temperature
                                   : NAN);
}

static void list_materials(const kent_listing *l)
{
    const kent_shown gpa = kent_shown_unit(KENT_MODULUS, l->units);
    const kent_shown mm = kent_shown_unit(KENT_DIAMETER, l->units);
    const kent_shown density = kent_shown_unit(KENT_DENSITY, l->units);
    const kent_shown degree = kent_shown_unit(KENT_TEMPERATURE, l->units);
    const kent_column columns[] = {
        {"material", "", KENT_ALIGN_LEFT, false},
        {"modulus", gpa.text, KENT_ALIGN_RIGHT, false},
        {"Poisson", "", KENT_ALIGN_RIGHT, false},
        {"density", density.text, KENT_ALIGN_RIGHT, false},
        {"roughness", mm.text, KENT_ALIGN_RIGHT, false},
        {"lining", gpa.text, KENT_ALIGN_RIGHT, false},
        {"creep", "elements", KENT_ALIGN_RIGHT, false},
        {"warmest", degree.text, KENT_ALIGN_RIGHT, false},
        {"status", "", KENT_ALIGN_LEFT, false},
        {"source", "", KENT_ALIGN_LEFT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < l->catalogue->material_count; i++) {
        const kent_material *m = &l->catalogue->materials[i];
        if (!wanted(l, m->id, "", "", m->from.source, m->from.status)) continue;
        kent_table_cell(&t, "%s", m->id);
        quantity(l, &t, KENT_MODULUS, m->modulus);
        number(&t, m->poisson, 2);
        quantity(l, &t, KENT_DENSITY, m->density);
        number(&t, kent_units_shown(KENT_DIAMETER, l->units, m->roughness), 4);
        quantity(l, &t, KENT_MODULUS,
                 m->lining_modulus > 0.0 ? m->lining_modulus : NAN);
        kent_table_cell(&t, "%zu", m->creep_count);
        warmest(l, &t, m);
        origin(l, &t, &m->from);
    }
    finish(l, "Materials", &t);
}

static void list_valves(const kent_listing *l)
{
    static const double OPENINGS[] = {0.1, 0.25, 0.5, 0.75};
    const kent_column columns[] = {
        {"valve type", "", KENT_ALIGN_LEFT, false},
        {"K open", "", KENT_ALIGN_RIGHT, false},
        {"E at 0.10", "relative", KENT_ALIGN_RIGHT, false},
        {"at 0.25", "", KENT_ALIGN_RIGHT, false},
        {"at 0.50", "", KENT_ALIGN_RIGHT, false},
        {"at 0.75", "", KENT_ALIGN_RIGHT, false},
        {"assumed", "below", KENT_ALIGN_RIGHT, false},
        {"status", "", KENT_ALIGN_LEFT, false},
        {"source", "", KENT_ALIGN_LEFT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < l->catalogue->valve_count; i++) {
        const kent_valve_type *v = &l->catalogue->valves[i];
        if (!wanted(l, v->id, "", "", v->from.source, v->from.status)) continue;
        const bool known = v->curve.count > 0; /* else fully open only */
        kent_table_cell(&t, "%s", v->id);
        number(&t, v->loss, 2);
        for (size_t k = 0; k < sizeof OPENINGS / sizeof OPENINGS[0]; k++) {
            number(&t,
                   known ? kent_valve_relative_capacity(&v->curve, OPENINGS[k]) : NAN,
                   3);
        }
        number(&t, known ? v->curve.lowest_given : NAN, 2);
        origin(l, &t, &v->from);
    }
    finish(l, "Valves: capacity E against opening, relative to full opening", &t);
}

/* Of a whole number of eighths of a turn: head and torque over their rated values. */
static void suter(kent_table *t, const kent_suter *s, size_t eighth)
{
    const size_t i = eighth * (KENT_SUTER_POINTS - 1) / 8;
    number(t, s->wh[i], 3);
    number(t, s->wb[i], 3);
}

/* Each by where it is easy to picture: one of flow and speed is nil, the other rated.
 */
static void list_pumps(const kent_listing *l)
{
    const kent_column columns[] = {
        {"characteristic", "", KENT_ALIGN_LEFT, false},
        {"specific speed", "rpm, m3/s, m", KENT_ALIGN_RIGHT, false},
        {"no flow", "head", KENT_ALIGN_RIGHT, false},
        {"", "torque", KENT_ALIGN_RIGHT, false},
        {"still", "head", KENT_ALIGN_RIGHT, false},
        {"", "torque", KENT_ALIGN_RIGHT, false},
        {"flow back", "head", KENT_ALIGN_RIGHT, false},
        {"", "torque", KENT_ALIGN_RIGHT, false},
        {"status", "", KENT_ALIGN_LEFT, false},
        {"source", "", KENT_ALIGN_LEFT, false},
    };
    enum { BACK = 2, NO_FLOW = 4, ONWARDS = 6 }; /* eighths of a turn */
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < KENT_SUTER_CURVES; i++) {
        const kent_suter *s = &KENT_SUTER[i];
        kent_provenance from = {.status = "memory"};
        char id[32];
        (void)snprintf(id, sizeof id, "Suter-%.0f", s->specific_speed);
        (void)snprintf(from.source, sizeof from.source, "%s", KENT_SUTER_SOURCE);
        if (!wanted(l, id, "", "", from.source, from.status)) continue;
        kent_table_cell(&t, "%s", id);
        number(&t, s->specific_speed, 0);
        suter(&t, s, NO_FLOW);
        suter(&t, s, ONWARDS);
        suter(&t, s, BACK);
        origin(l, &t, &from);
    }
    finish(
        l,
        "Pumps: complete characteristics (Suter), for what a pump's own curve does not "
        "say: head\nand torque over the rated ones, at rated speed without flow, and "
        "standing still with the\nrated flow onwards and back",
        &t);
}

/* How the bearing is known: "191.5", "48.0 at 0.75 to 97.0 at 1.50 m", "23.6 per m",
 * "0.50 of the passive". */
static void bearing(const kent_listing *l, kent_table *t, const kent_soil *s)
{
    const kent_shown m = kent_shown_unit(KENT_LENGTH, l->units);
    const double depth = kent_units_display(KENT_LENGTH, l->units).factor; /* per m */
    switch (s->route) {
    case KENT_BEARING_CONSTANT:
        quantity(l, t, KENT_STRESS, s->allowable_bearing);
        return;
    case KENT_BEARING_BY_DEPTH: {
        const kent_depth_row *last = &s->by_depth[s->by_depth_count - 1];
        kent_table_cell(
            t, "%s at %s to %s at %s %s",
            kent_shown_quantity(KENT_STRESS, l->units, s->by_depth[0].bearing).text,
            kent_shown_quantity(KENT_LENGTH, l->units, s->by_depth[0].depth).text,
            kent_shown_quantity(KENT_STRESS, l->units, last->bearing).text,
            kent_shown_quantity(KENT_LENGTH, l->units, last->depth).text, m.text);
        return;
    }
    case KENT_BEARING_GRADIENT:
        kent_table_cell(
            t, "%s per %s",
            kent_shown_quantity(KENT_STRESS, l->units, s->bearing_gradient / depth)
                .text,
            m.text);
        return;
    case KENT_BEARING_PASSIVE:
        kent_table_cell(t, "%.2f of the passive", s->passive_share);
        return;
    }
}

static void list_soils(const kent_listing *l)
{
    const kent_shown kpa = kent_shown_unit(KENT_STRESS, l->units);
    const kent_column columns[] = {
        {"soil", "", KENT_ALIGN_LEFT, false},
        {"bearing", kpa.text, KENT_ALIGN_LEFT, false},
        {"factor", "inside", KENT_ALIGN_RIGHT, false},
        {"friction", "concrete", KENT_ALIGN_RIGHT, false},
        {"relied on", "", KENT_ALIGN_LEFT, false},
        {"source", "", KENT_ALIGN_LEFT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < l->catalogue->soil_count; i++) {
        const kent_soil *s = &l->catalogue->soils[i];
        if (!wanted(l, s->id, "", "", s->source, "")) continue;
        kent_table_cell(&t, "%s", s->id);
        bearing(l, &t, s);
        number(&t, s->factor_inside, 2);
        if (isnan(s->base_cohesion)) {
            number(&t, s->base_friction, 2);
        } else {
            kent_table_cell(
                &t, "%s",
                kent_shown_with_unit(KENT_STRESS, l->units, s->base_cohesion).text);
        }
        const bool natural = s->nature == KENT_NATURAL;
        kent_table_cell(&t, "%s%s%s", s->unreliable ? "no" : "yes", natural ? "" : ", ",
                        natural ? "" : kent_nature_word(s->nature));
        source(l, &t, s->source);
    }
    finish(l, "Soils: allowable horizontal bearing", &t);
}

static void list_concretes(const kent_listing *l)
{
    const kent_shown strength = kent_shown_unit(KENT_STRENGTH, l->units);
    const kent_column columns[] = {
        {"concrete", "", KENT_ALIGN_LEFT, false},
        {"strength", strength.text, KENT_ALIGN_RIGHT, false},
        {"source", "", KENT_ALIGN_LEFT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < l->catalogue->concrete_count; i++) {
        const kent_concrete *c = &l->catalogue->concretes[i];
        if (!wanted(l, c->id, "", "", c->source, "")) continue;
        kent_table_cell(&t, "%s", c->id);
        quantity(l, &t, KENT_STRENGTH, c->strength);
        source(l, &t, c->source);
    }
    finish(l, "Concretes: strength of a cylinder after 28 days", &t);
}

/* Sets of rules have too many values for a row: one paragraph each. */
static void list_rules(const kent_listing *l)
{
    size_t listed = 0;
    for (size_t i = 0; i < l->catalogue->rule_count; i++) {
        const kent_rules *r = &l->catalogue->rules[i];
        kent_text words = {0};
        if (!wanted(l, r->id, "", "", r->source, "")) continue;
        if (listed++ == 0) {
            kent_text_add(l->out, "%sDesign rules\n", l->out->length > 0 ? "\n" : "");
        }
        kent_text_add(&words, "%s: ", r->id);
        kent_told_shape(r, l->units, &words);
        kent_told_asked(r, l->units, &words);
        kent_text_add(&words, ". Source: %s", r->source);
        kent_table_paragraph(l->out, l->limit, "", kent_text_of(&words));
        l->out->failed = l->out->failed || words.failed;
        kent_text_clear(&words);
    }
}

kent_status kent_report_catalogue(const kent_catalogue *c, const kent_choice *choice,
                                  const kent_report_options *o, kent_sink sink,
                                  size_t *rows)
{
    static const struct {
        const char *word;
        void (*list)(const kent_listing *l);
    } PARTS[] = {{"pipes", list_pipes},   {"materials", list_materials},
                 {"valves", list_valves}, {"pumps", list_pumps},
                 {"soils", list_soils},   {"concretes", list_concretes},
                 {"rules", list_rules}};
    kent_text out = {0};
    kent_notes sources = {0};
    const kent_listing l = {.catalogue = c,
                            .choice = choice,
                            .rows = rows,
                            .units = o->units,
                            .limit = o->wide ? 0 : KENT_TABLE_LIMIT,
                            .sources = &sources,
                            .out = &out};
    *rows = 0;
    for (size_t i = 0; i < sizeof PARTS / sizeof PARTS[0]; i++) {
        if (!choice->part || strcmp(choice->part, PARTS[i].word) == 0) {
            PARTS[i].list(&l);
        }
    }
    const kent_status status = kent_sink_flush(sink, &out);
    kent_notes_clear(&sources);
    kent_text_clear(&out);
    return status;
}
