/* The schedule of restrained pipe, and who is near whom. */
#include "kent_page.h"
#include "kent_shown.h"

/* Printed unless wide; the rest is counted. */
enum { ROWS = 24 };

static void heading(kent_page *page, const char *words, size_t left, kent_table *t)
{
    kent_text all = {0};
    kent_text_add(&all, "%s", words);
    if (left > 0) kent_text_add(&all, " (%zu more with --wide)", left);
    kent_page_finish(page, kent_text_of(&all), t);
    page->out->failed = page->out->failed || all.failed;
    kent_text_clear(&all);
}

static void joints_cell(int joints, kent_table *t)
{
    if (joints > 0) {
        kent_table_cell(t, "%d", joints);
    } else {
        kent_table_cell(t, "%s", KENT_SHOWN_NONE);
    }
}

/* ---- restrained pipe ------------------------------------------------------------- */

static void stretch_cells(const kent_page *page, const kent_stretch *s, kent_table *t)
{
    kent_table_cell(t, "%s", page->model->pipes[s->pipe].id);
    kent_table_cell(t, "%s", kent_shown_station(page->units, s->station_from).text);
    kent_table_cell(t, "%s", kent_shown_station(page->units, s->station_to).text);
    kent_table_cell(
        t, "%s", kent_shown_quantity(KENT_LENGTH, page->units, s->to - s->from).text);
    joints_cell(s->joints, t);
}

static void names_cell(const kent_page *page, const kent_system_of *system,
                       kent_table *t)
{
    const kent_systems *all = &page->results->restraints->systems;
    kent_text names = {0};
    for (size_t i = 0; i < system->fitting_count; i++) {
        const size_t f = all->fittings[system->fitting_first + i];
        kent_text_add(&names, "%s%s", i > 0 ? ", " : "", page->model->fittings[f].id);
    }
    kent_table_cell(t, "%s", kent_text_of(&names));
    t->failed = t->failed || names.failed;
    kent_text_clear(&names);
}

/* One row for each stretch; what the system is told with the first. */
static void system_rows(const kent_page *page, size_t index, kent_table *t)
{
    const kent_systems *all = &page->results->restraints->systems;
    const kent_system_of *system = &all->at[index];
    for (size_t i = 0; i < system->stretch_count; i++) {
        if (i == 0) {
            kent_table_cell(t, "S%zu", index + 1);
            names_cell(page, system, t);
        } else {
            kent_table_cell(t, "%s", "");
            kent_table_cell(t, "%s", "");
        }
        stretch_cells(page, &all->stretches[system->stretch_first + i], t);
        kent_table_cell(t, "%s", i > 0 ? "" : system->fits ? "yes" : "no!");
    }
}

static void print_systems(kent_page *page)
{
    const kent_shown m = kent_shown_unit(KENT_LENGTH, page->units);
    const kent_column columns[] = {
        {"system", "", KENT_ALIGN_LEFT, false},
        {"holds", "", KENT_ALIGN_LEFT, true},
        {"pipe", "", KENT_ALIGN_LEFT, true},
        {"from", "", KENT_ALIGN_RIGHT, false},
        {"to", "", KENT_ALIGN_RIGHT, false},
        {"length", m.text, KENT_ALIGN_RIGHT, false},
        {"joints", "", KENT_ALIGN_RIGHT, false},
        {"fits", "", KENT_ALIGN_LEFT, false},
    };
    const kent_systems *all = &page->results->restraints->systems;
    const size_t shown = page->wide || all->count < ROWS ? all->count : ROWS;
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < shown; i++) {
        system_rows(page, i, &t);
    }
    heading(page, "Restrained pipe: every joint from, to", all->count - shown, &t);
}

/* ---- neighbours ------------------------------------------------------------------ */

static const char *meeting_says(kent_meeting how)
{
    switch (how) {
    case KENT_MEETS_BODY:
        return "concrete in the same place";
    case KENT_MEETS_OPENED:
        return "its block stands in this ground";
    case KENT_MEETS_SHARED:
        return "both lean on the same ground";
    case KENT_MEETS_MAIN:
        return "a main runs through this ground";
    }
    return "";
}

static void print_neighbours(kent_page *page)
{
    const kent_model *m = page->model;
    const kent_space *space = &page->results->restraints->space;
    const kent_shown unit = kent_shown_unit(KENT_LENGTH, page->units);
    const kent_column columns[] = {
        {"point", "", KENT_ALIGN_LEFT, true},
        {"near", "", KENT_ALIGN_LEFT, true},
        {"how", "", KENT_ALIGN_LEFT, false},
        {"clear", unit.text, KENT_ALIGN_RIGHT, false},
        {"of its ground", "%", KENT_ALIGN_RIGHT, false},
    };
    const size_t shown = page->wide || space->count < ROWS ? space->count : ROWS;
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < shown; i++) {
        const kent_neighbour *n = &space->met[i];
        kent_table_cell(&t, "%s", m->fittings[n->fitting].id);
        kent_table_cell(
            &t, "%s", n->other >= 0 ? m->fittings[n->other].id : m->pipes[n->pipe].id);
        kent_table_cell(&t, "%s", meeting_says(n->how));
        kent_table_cell(&t, "%s",
                        kent_shown_quantity(KENT_LENGTH, page->units, n->clear).text);
        kent_table_cell(&t, "%s", kent_shown_number(100.0 * n->share, 0).text);
    }
    heading(page, "Neighbours that share ground", space->count - shown, &t);
}

void kent_page_systems(kent_page *page)
{
    print_systems(page);
    print_neighbours(page);
}
