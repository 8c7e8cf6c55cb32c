/* Pull along pipes: of fused and welded strings at their ends, and down steep ground.
 */
#include "kent_page.h"
#include "kent_shown.h"

#include <math.h>

/* ---- ends of strings ------------------------------------------------------------- */

static const char *holder_says(const kent_pull_end *p)
{
    switch (p->holder) {
    case KENT_PULL_NOTHING:
        return p->known ? "nothing!" : KENT_SHOWN_NONE;
    case KENT_PULL_WALL:
        return "wall";
    case KENT_PULL_ANCHOR:
        return "anchor block";
    case KENT_PULL_JOINTS:
        return "joints beyond";
    case KENT_PULL_ITSELF:
        return "itself, closed";
    }
    return "";
}

/* m or ft to one decimal. */
static kent_shown length_of(const kent_page *page, double length)
{
    return kent_shown_number(kent_units_shown(KENT_LENGTH, page->units, length), 1);
}

static void end_row(const kent_page *page, const kent_pull_end *p, kent_table *t)
{
    const kent_model *m = page->model;
    const kent_strings *strings = &page->results->loads->strings;
    const kent_string_end *e = &strings->ends[p->end];
    const bool any = p->known && e->case_count > 0;
    kent_table_cell(t, "%s", m->points[e->point].id);
    kent_table_cell(t, "%s", m->pipes[m->spans[e->span].pipe].id);
    kent_table_cell(t, "%s", length_of(page, strings->length[e->string]).text);
    kent_table_cell(t, "%s", any ? e->cases[p->governing].title.s : KENT_SHOWN_NONE);
    kent_table_cell(
        t, "%s",
        kent_shown_quantity(KENT_FORCE, page->units, any ? p->pull : NAN).text);
    kent_table_cell(
        t, "%s",
        kent_shown_quantity(KENT_FORCE, page->units, any ? p->factored : NAN).text);
    kent_table_cell(t, "%s", holder_says(p));
    kent_table_cell(t, "%s",
                    kent_shown_number(kent_units_shown(KENT_DIAMETER, page->units,
                                                       any ? p->movement : NAN),
                                      page->units == KENT_SI ? 0 : 2)
                        .text);
    kent_table_cell(t, "%s", length_of(page, any ? p->beyond_length : NAN).text);
}

static void print_ends(kent_page *page)
{
    const kent_pulls *pulls = &page->results->restraints->pulls;
    const kent_shown m = kent_shown_unit(KENT_LENGTH, page->units);
    const kent_shown mm = kent_shown_unit(KENT_DIAMETER, page->units);
    const kent_shown kn = kent_shown_unit(KENT_FORCE, page->units);
    const kent_column columns[] = {
        {"at", "", KENT_ALIGN_LEFT, true},
        {"pipe", "", KENT_ALIGN_LEFT, true},
        {"string", m.text, KENT_ALIGN_RIGHT, false},
        {"governed by", "", KENT_ALIGN_LEFT, true},
        {"pull", kn.text, KENT_ALIGN_RIGHT, false},
        {"×SF", kn.text, KENT_ALIGN_RIGHT, false},
        {"held by", "", KENT_ALIGN_LEFT, false},
        {"free moves", mm.text, KENT_ALIGN_RIGHT, false},
        {"or joints", m.text, KENT_ALIGN_RIGHT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    kent_text words = {0};
    if (pulls->end_count == 0) return;
    for (size_t i = 0; i < pulls->end_count; i++) {
        end_row(page, &pulls->ends[i], &t);
    }
    kent_page_finish(page, "Pull at the ends of fused and welded strings", &t);
    kent_text_add(&words, "Pull: what pressure and cold draw the end into the string "
                          "with. Free moves: by how much it comes in where nothing "
                          "holds it. Or joints: beyond it, restrained over that.");
    kent_page_say(page, "", &words);
}

/* ---- steep ground ---------------------------------------------------------------- */

static void steep_row(const kent_page *page, const kent_steep *s, kent_table *t)
{
    const kent_system u = page->units;
    const bool anchored = s->anchors > 0;
    kent_table_cell(t, "%s", page->model->pipes[s->pipe].id);
    kent_table_cell(t, "%s", kent_shown_station(u, s->from).text);
    kent_table_cell(t, "%s", kent_shown_station(u, s->to).text);
    kent_table_cell(t, "%s", kent_shown_number(1.0 / fabs(s->slope), 1).text);
    kent_table_cell(t, "%s",
                    kent_shown_quantity(KENT_FORCE_PER_LENGTH, u, s->along).text);
    kent_table_cell(t, "%s",
                    kent_shown_quantity(KENT_FORCE_PER_LENGTH, u, s->friction).text);
    if (anchored) {
        kent_table_cell(t, "%d", s->anchors);
    } else {
        kent_table_cell(t, "%s", KENT_SHOWN_NONE);
    }
    kent_table_cell(t, "%s", length_of(page, anchored ? s->spacing : NAN).text);
    kent_table_cell(
        t, "%s",
        kent_shown_quantity(KENT_FORCE, u, anchored ? s->anchor_force : NAN).text);
    kent_table_cell(t, "%s", kent_shown_quantity(KENT_FORCE, u, s->hangs).text);
}

static void print_steeps(kent_page *page)
{
    const kent_pulls *pulls = &page->results->restraints->pulls;
    const kent_shown m = kent_shown_unit(KENT_LENGTH, page->units);
    const kent_shown kn = kent_shown_unit(KENT_FORCE, page->units);
    const kent_shown per = kent_shown_unit(KENT_FORCE_PER_LENGTH, page->units);
    const kent_column columns[] = {
        {"pipe", "", KENT_ALIGN_LEFT, true},
        {"from", "", KENT_ALIGN_RIGHT, false},
        {"to", "", KENT_ALIGN_RIGHT, false},
        {"1 in", "", KENT_ALIGN_RIGHT, false},
        {"slides by", per.text, KENT_ALIGN_RIGHT, false},
        {"friction", per.text, KENT_ALIGN_RIGHT, false},
        {"anchors", "", KENT_ALIGN_RIGHT, false},
        {"every", m.text, KENT_ALIGN_RIGHT, false},
        {"each ×SF", kn.text, KENT_ALIGN_RIGHT, false},
        {"or hangs ×SF", kn.text, KENT_ALIGN_RIGHT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < pulls->steep_count; i++) {
        steep_row(page, &pulls->steeps[i], &t);
    }
    kent_page_finish(page, "Steep pipe: anchors, no friction counted", &t);
}

void kent_page_pulls(kent_page *page)
{
    print_ends(page);
    print_steeps(page);
}
