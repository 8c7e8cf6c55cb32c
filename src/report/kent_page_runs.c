/* What supports of runs above ground must take along them. */
#include "kent_page.h"
#include "kent_shown.h"

#include <math.h>

/* Printed unless wide: in order along the main; the rest is counted. */
enum { RUN_ROWS = 24 };

static const char *scenario_of(const kent_model *m, const kent_run_worst *at)
{
    return at->march >= 0 ? m->scenarios[m->marches[at->march].scenario].id : "";
}

/* Its size, when, and in which scenario. */
static void way_cells(const kent_page *page, const kent_run *run, bool forward,
                      kent_table *t)
{
    const kent_run_worst at = kent_run_most(page->model, run, forward);

    kent_table_cell(t, "%s",
                    kent_shown_quantity(KENT_FORCE, page->units, fabs(at.force)).text);
    kent_table_cell(t, "%s", at.march >= 0 ? kent_shown_number(at.time, 2).text : "");
    kent_table_cell(t, "%s", scenario_of(page->model, &at));
}

static void run_row(const kent_page *page, const kent_run *run, kent_table *t)
{
    const kent_model *m = page->model;
    const double weight =
        run->water_weight + (isnan(run->pipe_weight) ? 0.0 : run->pipe_weight);

    kent_table_cell(t, "%s > %s", m->points[run->from].id, m->points[run->to].id);
    kent_table_cell(t, "%s",
                    kent_shown_quantity(KENT_LENGTH, page->units, run->length).text);
    way_cells(page, run, true, t);
    way_cells(page, run, false, t);
    kent_table_cell(t, "%s%s",
                    kent_shown_quantity(KENT_FORCE, page->units, weight).text,
                    isnan(run->pipe_weight) ? "*" : "");
}

static void say_what_it_means(kent_page *page, bool massless, bool slips)
{
    kent_text words = {0};

    kent_text_add(
        &words, "What the changing flow leaves out of balance along each run, towards "
                "its second point and back, before any factor, in scenarios that "
                "decide; weight is the part of water and pipe along it, positive "
                "towards the second point, and comes on top.");
    if (massless) {
        kent_text_add(&words, " *: of the water alone, the pipe's mass is "
                              "not known.");
    }
    if (slips) {
        kent_text_add(&words, " Where joints slip each pipe needs an anchor of its "
                              "own: nothing passes from one to the next.");
    }
    kent_page_say(page, "", &words);
}

void kent_page_runs(kent_page *page)
{
    const kent_shown length = kent_shown_unit(KENT_LENGTH, page->units);
    const kent_shown force = kent_shown_unit(KENT_FORCE, page->units);
    const kent_column columns[] = {
        {"run above ground", "", KENT_ALIGN_LEFT, true},
        {"length", length.text, KENT_ALIGN_RIGHT, false},
        {"forward", force.text, KENT_ALIGN_RIGHT, false},
        {"at", "s", KENT_ALIGN_RIGHT, false},
        {"in", "", KENT_ALIGN_LEFT, true},
        {"back", force.text, KENT_ALIGN_RIGHT, false},
        {"at", "s", KENT_ALIGN_RIGHT, false},
        {"in", "", KENT_ALIGN_LEFT, true},
        {"weight", force.text, KENT_ALIGN_RIGHT, false},
    };
    const kent_loads_result *loads = page->results->loads;
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    kent_text heading = {0};
    bool massless = false, slips = false;
    size_t left = 0;

    if (loads->run_count == 0) return;
    for (size_t i = 0; i < loads->run_count; i++) {
        const kent_run *run = &loads->runs[i];
        if (!page->wide && i >= RUN_ROWS) {
            left++;
            continue;
        }
        massless |= isnan(run->pipe_weight);
        slips |= run->slips;
        run_row(page, run, &t);
    }
    kent_text_add(&heading, "Runs above ground");
    if (left > 0) kent_text_add(&heading, " (%zu more with --wide)", left);
    kent_page_finish(page, kent_text_of(&heading), &t);
    say_what_it_means(page, massless, slips);
    page->out->failed = page->out->failed || heading.failed;
    kent_text_clear(&heading);
}
