/* A scenario beside the one whose events it repeats: with and without protection. */
#include "kent_page.h"
#include "kent_parting.h"
#include "kent_pressures.h"
#include "kent_shown.h"
#include "kent_twins.h"

#include <math.h>
#include <stdlib.h>

enum { PLACES = 8 }; /* printed unless wide: those that change most */

static const kent_scenario_result *run_of(const kent_page *page, const kent_twins *t,
                                          int which)
{
    return &page->results->scenarios[t->march[which]];
}

static const char *id_of(const kent_page *page, const kent_twins *t, int which)
{
    return page->model->scenarios[run_of(page, t, which)->scenario].id;
}

/* Pa: by how much a place differs between the two. */
static double change_at(const kent_twin_place *p)
{
    return fmax(fabs(p->highest[KENT_ITSELF] - p->highest[KENT_BESIDE]),
                fabs(p->lowest[KENT_ITSELF] - p->lowest[KENT_BESIDE]));
}

static int by_change(const void *a, const void *b)
{
    const kent_twin_place *x = a, *y = b;
    const double gap = change_at(y) - change_at(x);
    return gap > 0.0 ? 1 : gap < 0.0 ? -1 : x->point - y->point;
}

static void twin_row(const kent_page *page, const char *name, const double highest[2],
                     const double lowest[2], kent_table *t)
{
    const double *const both[] = {highest, lowest};
    kent_table_cell(t, "%s", name);
    for (int i = 0; i < 2; i++) {
        for (int k = KENT_TWINS - 1; k >= 0; k--) { /* the other one first */
            kent_table_cell(
                t, "%s",
                kent_shown_quantity(KENT_PRESSURE, page->units, both[i][k]).text);
        }
    }
}

static void anywhere_row(const kent_page *page, const kent_twins *t, kent_table *table)
{
    double highest[KENT_TWINS], lowest[KENT_TWINS];
    for (int k = 0; k < KENT_TWINS; k++) {
        const size_t march = (size_t)t->march[k];
        highest[k] = kent_extreme_highest(page->results, march).pressure;
        lowest[k] = kent_extreme_lowest(page->results, march).pressure;
    }
    twin_row(page, "anywhere", highest, lowest, table);
}

/* "Left out of bare: VES1." */
static void add_left_out(const kent_page *page, const kent_twins *t, kent_text *out)
{
    const kent_model *m = page->model;
    const int scenario = run_of(page, t, KENT_ITSELF)->scenario;
    bool any = false;
    for (size_t i = 0; i < m->device_count; i++) {
        if (!kent_device_is_left_out(m, i, scenario)) continue;
        if (kent_device_is_left_out(m, i, run_of(page, t, KENT_BESIDE)->scenario)) {
            continue;
        }
        if (!any) kent_text_add(out, "Left out of %s: ", id_of(page, t, KENT_ITSELF));
        kent_text_add(out, "%s%s", any ? ", " : "", kent_device_name(m, i).s);
        any = true;
    }
    if (any) kent_text_add(out, ". ");
}

static void add_cavities(const kent_page *page, const kent_twins *t, kent_text *out)
{
    const double with = kent_twins_cavity(run_of(page, t, KENT_BESIDE));
    const double without = kent_twins_cavity(run_of(page, t, KENT_ITSELF));
    if (with <= 0.0 && without <= 0.0) return;
    kent_text_add(out, "Largest cavity %s in %s, ",
                  kent_parting_volume(page->units, with).s,
                  id_of(page, t, KENT_BESIDE));
    kent_text_add(out, "%s in %s. ", kent_parting_volume(page->units, without).s,
                  id_of(page, t, KENT_ITSELF));
}

/* Flow back through what stands in line, where there is any. */
static void add_reverse(const kent_page *page, const kent_twins *t, kent_text *out)
{
    const kent_model *m = page->model;
    for (size_t i = 0; i < m->device_count; i++) {
        const double with = run_of(page, t, KENT_BESIDE)->devices[i].flow.lowest;
        const double without = run_of(page, t, KENT_ITSELF)->devices[i].flow.lowest;
        if (!kent_device_in_line(m->devices[i].kind)) continue;
        if (!(fmin(with, without) < 0.0)) continue;
        kent_text_add(
            out, "Back through %s: %s in %s, ", m->devices[i].id,
            kent_shown_with_unit(KENT_FLOW, page->units, fmax(0.0, -with)).text,
            id_of(page, t, KENT_BESIDE));
        kent_text_add(
            out, "%s in %s. ",
            kent_shown_with_unit(KENT_FLOW, page->units, fmax(0.0, -without)).text,
            id_of(page, t, KENT_ITSELF));
    }
}

static void print_twins(kent_page *page, const kent_twins *t, kent_twin_place *places)
{
    const kent_model *m = page->model;
    const char *other = id_of(page, t, KENT_BESIDE);
    const char *itself = id_of(page, t, KENT_ITSELF);
    const kent_column columns[] = {
        {"at", "", KENT_ALIGN_LEFT, true},
        {"highest", other, KENT_ALIGN_RIGHT, false},
        {"highest", itself, KENT_ALIGN_RIGHT, false},
        {"lowest", other, KENT_ALIGN_RIGHT, false},
        {"lowest", itself, KENT_ALIGN_RIGHT, false},
    };
    kent_table table = {.columns = columns,
                        .column_count = sizeof columns / sizeof columns[0]};
    kent_text heading = {0}, words = {0};
    const size_t count = kent_twins_places(page->results, t, places);
    const size_t shown = page->wide || count < PLACES ? count : PLACES;
    if (shown < count) qsort(places, count, sizeof *places, by_change);
    anywhere_row(page, t, &table);
    for (size_t i = 0; i < shown; i++) {
        const kent_twin_place *p = &places[i];
        twin_row(page, m->points[p->point].id, p->highest, p->lowest, &table);
    }
    kent_text_add(&heading, "%s beside %s%s, %s",
                  kent_name_in_state(m, itself, run_of(page, t, KENT_ITSELF)->state).s,
                  other, shown < count ? ", where they differ most" : "",
                  kent_units_display(KENT_PRESSURE, page->units).unit);
    kent_page_finish(page, kent_text_of(&heading), &table);
    add_left_out(page, t, &words);
    add_cavities(page, t, &words);
    add_reverse(page, t, &words);
    if (words.length > 0) kent_page_say(page, "", &words);
    page->out->failed = page->out->failed || heading.failed || words.failed;
    kent_text_clear(&heading);
    kent_text_clear(&words);
}

void kent_page_twins(kent_page *page)
{
    const kent_results *r = page->results;
    kent_twin_place *places = kent_alloc(r->model->point_count, sizeof *places);
    if (!places) {
        page->out->failed = true;
        return;
    }
    for (size_t i = 0; i < r->scenario_count; i++) {
        kent_twins t;
        if (kent_twins_of(r, i, &t)) print_twins(page, &t, places);
    }
    free(places);
}
