/* What every case reached, against what is asked of it. Never "in order": whoever reads
 * it judges. */
#include "kent_limit_table.h"
#include "kent_page.h"
#include "kent_said.h"
#include "kent_shown.h"

#include <math.h>
#include <string.h>

/* ---- which rows ------------------------------------------------------------------ */

static bool of_one_case(const kent_limit *a, const kent_limit *b)
{
    return a->kind == b->kind && a->state == b->state && a->march == b->march &&
           strcmp(a->when.s, b->when.s) == 0;
}

/* The larger the nearer to its limit, or beyond it; what nobody asks for comes after
 * all that somebody does. */
static double nearness(const kent_limit *l, bool asked)
{
    const bool below = l->kind == KENT_LIMIT_LOWEST || l->kind == KENT_LIMIT_VAPOUR;
    if (asked && isnan(l->asked)) return -INFINITY;
    if (below) return -l->reached;
    return asked ? l->reached / l->asked : l->reached;
}

/* Of the rows of one case and kind that start at `first`: the worst, and where the next
 * start. */
static size_t worst_of(const kent_results *r, size_t first, size_t *next)
{
    size_t end = first;
    size_t worst = first;
    bool asked = false;
    while (end < r->limit_count && of_one_case(&r->limits[first], &r->limits[end])) {
        asked = asked || !isnan(r->limits[end].asked);
        end++;
    }
    for (size_t i = first; i < end; i++) {
        const kent_limit *l = &r->limits[i];
        if (nearness(l, asked) > nearness(&r->limits[worst], asked)) worst = i;
    }
    *next = end;
    return worst;
}

/* ---- cells ----------------------------------------------------------------------- */

static const char *rating_word(kent_rating rating)
{
    switch (rating) {
    case KENT_RATING_SURGE:
        return ", surge";
    case KENT_RATING_RECURRING:
        return ", recurring";
    case KENT_RATING_TEST:
        return ", test";
    case KENT_RATING_SERVICE:
    case KENT_RATINGS:
        break;
    }
    return ", service";
}

static const char *subject_of(const kent_model *m, const kent_limit *l)
{
    return l->note >= 0 ? m->notes[l->note].id : m->pipes[l->pipe].id;
}

static void place_cell(const kent_page *page, const kent_limit *l, kent_table *t)
{
    const kent_model *m = page->model;
    if (l->point >= 0) {
        kent_table_cell(t, "%s", m->points[l->point].id);
    } else if (l->span >= 0) {
        kent_table_cell(t, "%s along",
                        kent_said_whole(KENT_LENGTH, page->units, l->chainage).s);
    } else {
        kent_table_cell(t, "%s", subject_of(m, l)); /* its ports */
    }
}

/* What the figure is by; or that there is none. */
static void reason_cell(const kent_model *m, const kent_limit *l, kent_table *t)
{
    const char *standard = l->note >= 0                 ? m->notes[l->note].standard
                           : l->kind == KENT_LIMIT_PIPE ? m->pipes[l->pipe].standard
                                                        : "";
    const char *why = standard;
    if (l->kind == KENT_LIMIT_COLLAPSE) {
        why = isnan(l->asked) ? "" : "unsupported ring, no factor";
    } else if (isnan(l->asked)) {
        why = l->kind == KENT_LIMIT_LOWEST ? "nobody asks" : "no rating is known";
    } else if (l->kind == KENT_LIMIT_VAPOUR) {
        why = l->exceeded ? "the water parts" : "where water boils";
    } else if (l->kind == KENT_LIMIT_LOWEST) {
        why = "the case";
    }
    kent_table_cell(t, "%s%s%s", l->for_comparison ? "for comparison" : "",
                    l->for_comparison && why[0] != '\0' ? "; " : "", why);
}

static void limit_row(const kent_page *page, const kent_limit *l, kent_table *t)
{
    const bool below = l->kind == KENT_LIMIT_LOWEST || l->kind == KENT_LIMIT_VAPOUR;
    const bool rated = l->kind == KENT_LIMIT_PIPE || l->kind == KENT_LIMIT_FITTING;
    const kent_shown reached =
        kent_shown_quantity(KENT_PRESSURE, page->units, l->reached);
    const kent_shown asked = kent_shown_quantity(KENT_PRESSURE, page->units, l->asked);
    kent_table_cell(t, "%s", l->when.s);
    kent_table_cell(t, "%s%s", kent_limit_word(l->kind),
                    rated ? rating_word(l->rating) : "");
    kent_table_cell(t, "%s", subject_of(page->model, l));
    place_cell(page, l, t);
    kent_table_cell(t, "%s", kent_shown_number(l->time, 1).text);
    kent_table_cell(t, "%s%s", reached.text, l->exceeded ? "!" : " ");
    if (isnan(l->asked)) {
        kent_table_cell(t, "%s", KENT_SHOWN_NONE);
    } else {
        kent_table_cell(t, "%s %s", below ? "≥" : "≤", asked.text);
    }
    reason_cell(page->model, l, t);
}

void kent_page_limits(kent_page *page)
{
    const kent_results *r = page->results;
    const char *bar = kent_units_display(KENT_PRESSURE, page->units).unit;
    const kent_column columns[] = {
        {"in", "", KENT_ALIGN_LEFT, true},
        {"limit", "", KENT_ALIGN_LEFT, false},
        {"of", "", KENT_ALIGN_LEFT, true},
        {"at", "", KENT_ALIGN_LEFT, true},
        {"time", "s", KENT_ALIGN_RIGHT, false},
        {"reached ", bar, KENT_ALIGN_RIGHT, false},
        {"asked", bar, KENT_ALIGN_RIGHT, false},
        {"by", "", KENT_ALIGN_LEFT, true},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    bool beyond = false, ring = false;
    for (size_t i = 0; i < r->limit_count;) {
        size_t next = i + 1;
        const size_t shown = page->wide ? i : worst_of(r, i, &next);
        limit_row(page, &r->limits[shown], &t);
        beyond = beyond || r->limits[shown].exceeded;
        ring = ring || r->limits[shown].kind == KENT_LIMIT_COLLAPSE;
        i = next;
    }
    if (t.cell_count == 0) {
        kent_table_clear(&t);
        return;
    }
    kent_page_finish(page,
                     page->wide ? "Reached, and asked"
                                : "Reached, and asked: the worst of each (--wide: all)",
                     &t);
    if (beyond) kent_text_add(page->out, "!  beyond what is asked\n");
    if (ring) {
        kent_table_paragraph(
            page->out, page->limit, "",
            "collapse: outer less inner pressure, against an unsupported round ring of "
            "the pipe's wall without a factor; soil, oval shape and lasting load on a "
            "plastic are left out.");
    }
}
