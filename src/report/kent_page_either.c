/* Block and restrained joints side by side, with what each takes to build. */
#include "kent_page.h"
#include "kent_shown.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

/* "14.2 + 9.6": what each leg asks, m or ft; "14.2 each" where they are alike. */
static void length_cell(const kent_page *page, const kent_holding *h, kent_table *t)
{
    kent_text cell = {0};
    bool alike = h->leg_count > 1;
    kent_shown first = {{0}};
    for (size_t i = 0; i < h->leg_count; i++) {
        const double length =
            kent_units_shown(KENT_LENGTH, page->units, h->legs[i].length);
        const kent_shown here = kent_shown_number(length, 1);
        kent_text_add(&cell, "%s%s", i > 0 ? " + " : "", here.text);
        if (i == 0) first = here;
        alike = alike && strcmp(first.text, here.text) == 0;
    }
    if (alike) {
        kent_text_reset(&cell);
        kent_text_add(&cell, "%s each", first.text);
    }
    kent_table_cell(t, "%s", h->leg_count > 0 ? kent_text_of(&cell) : KENT_SHOWN_NONE);
    t->failed = t->failed || cell.failed;
    kent_text_clear(&cell);
}

/* Of all legs; 0: the length of one pipe is not known. */
static int joints_of(const kent_holding *h)
{
    int joints = 0;
    for (size_t i = 0; i < h->leg_count; i++) {
        if (h->legs[i].pipes == 0) return 0;
        joints += h->legs[i].pipes;
    }
    return joints;
}

/* Why a leg ends too early: the first that does. */
static void add_stop(const kent_model *m, const kent_holding *h, kent_text *out)
{
    for (size_t i = 0; i < h->leg_count; i++) {
        const kent_leg *leg = &h->legs[i];
        if (leg->fits) continue;
        const char *at = leg->end_point >= 0 ? m->points[leg->end_point].id : "";
        switch (leg->end) {
        case KENT_LEG_AT_FITTING:
            kent_text_add(out, "joints: %s breaks them", at);
            return;
        case KENT_LEG_AT_SOFT:
            kent_text_add(out, "joints: soft ground at %s", at);
            return;
        case KENT_LEG_AT_PIPE_END:
            kent_text_add(out, "joints: pipe ends at %s", at);
            return;
        case KENT_LEG_IN_GROUND:
        case KENT_LEG_AT_STRUCTURE:
        case KENT_LEG_AT_DEAD_END:
            break;
        }
    }
    kent_text_add(out, "joints: see `explain`");
}

static void add_why_no_joints(const kent_model *m, const kent_holding *h,
                              kent_text *out)
{
    if (h->either.joints) return;
    if (h->either.no_length) {
        kent_text_add(out, "joints: %s", h->either.no_length);
    } else {
        add_stop(m, h, out);
    }
}

/* Why there is no block, and why no joints; both want two rows. */
static void why_cells(const kent_model *m, const kent_holding *h, size_t columns,
                      kent_table *t)
{
    const char *no_block = h->either.no_block;
    kent_text why = {0};
    add_why_no_joints(m, h, &why);
    if (no_block) {
        kent_table_cell(t, "block: %s", no_block);
    } else {
        kent_table_cell(t, "%s", kent_text_of(&why));
    }
    for (size_t i = 1; no_block && why.length > 0 && i < columns; i++) {
        kent_table_cell(t, "%s", "");
    }
    if (no_block && why.length > 0) kent_table_cell(t, "%s", kent_text_of(&why));
    t->failed = t->failed || why.failed;
    kent_text_clear(&why);
}

static const char *chosen_word(const kent_holding *h)
{
    if (!h->held) return "neither";
    switch (h->chosen) {
    case KENT_RESTRAINED_JOINTS:
        return "joints";
    case KENT_BLOCK_AND_JOINTS:
        return "both";
    case KENT_THRUST_BLOCK:
    case KENT_ANCHOR_BLOCK:
    case KENT_NO_RESTRAINT:
        break;
    }
    return "block";
}

static void either_row(const kent_page *page, size_t i, kent_table *t)
{
    const kent_model *m = page->model;
    const kent_holding *h = &page->results->restraints->fittings[i];
    const kent_either *e = &h->either;
    const bool block = e->block.type != KENT_BLOCK_NONE;
    const kent_quantities *q = &e->quantities;
    const int joints = joints_of(h);
    kent_table_cell(t, "%s", m->fittings[i].id);
    kent_table_cell(t, "%s", chosen_word(h));
    kent_table_cell(t, "%s",
                    block ? kent_shown_block(&e->block, page->units, KENT_TIGHT).text
                          : KENT_SHOWN_NONE);
    kent_table_cell(
        t, "%s",
        kent_shown_quantity(KENT_VOLUME, page->units, block ? q->concrete : NAN).text);
    kent_table_cell(
        t, "%s",
        kent_shown_quantity(KENT_VOLUME, page->units, block ? q->excavation : NAN)
            .text);
    length_cell(page, h, t);
    if (joints > 0) {
        kent_table_cell(t, "%d", joints);
    } else {
        kent_table_cell(t, "%s", KENT_SHOWN_NONE);
    }
    why_cells(m, h, t->column_count, t);
}

void kent_page_either(kent_page *page)
{
    const kent_shown m = kent_shown_unit(KENT_LENGTH, page->units);
    const kent_shown m3 = kent_shown_unit(KENT_VOLUME, page->units);
    char sides[KENT_SHOWN + 16];
    (void)snprintf(sides, sizeof sides, "w × h × t in %s", m.text);
    const kent_column columns[] = {
        {"point", "", KENT_ALIGN_LEFT, true},
        {"held by", "", KENT_ALIGN_LEFT, false},
        {"as a block", sides, KENT_ALIGN_LEFT, false},
        {"concrete", m3.text, KENT_ALIGN_RIGHT, false},
        {"dug", m3.text, KENT_ALIGN_RIGHT, false},
        {"by joints", m.text, KENT_ALIGN_RIGHT, false},
        {"joints", "", KENT_ALIGN_RIGHT, false},
        {"not both, as", "", KENT_ALIGN_LEFT, true},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < page->listing.count; i++) {
        const size_t f = page->listing.fitting[i];
        if (!page->results->restraints->fittings[f].either.looked_at) continue;
        either_row(page, f, &t);
    }
    kent_page_finish(page, "Block, or restrained joints", &t);
}
