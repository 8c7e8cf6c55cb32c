/* What devices did, and where the water parted. */
#include "kent_page.h"
#include "kent_parting.h"
#include "kent_said.h"
#include "kent_shown.h"

#include <math.h>
#include <stdio.h>

/* Printed of one scenario unless wide; the rest is counted. */
enum { DEVICE_ROWS = 24, CAVITY_ROWS = 4 };

static kent_name name_of(const kent_page *page, const kent_scenario_result *run)
{
    const kent_model *m = page->model;
    return kent_name_in_state(m, m->scenarios[run->scenario].id, run->state);
}

/* ---- devices --------------------------------------------------------------------- */

static bool is_shown(const kent_model *m, const kent_scenario_result *run, size_t i)
{
    const kent_device_extreme *e = &run->devices[i];
    const bool still = e->flow.highest == 0.0 && e->flow.lowest == 0.0;
    return m->devices[i].kind != KENT_DEVICE_BURST || !still;
}

static void swing_row(const kent_page *page, const char *name, const char *what,
                      kent_kind kind, const kent_swing *e, kent_table *t)
{
    if (isnan(e->highest)) return; /* never told */
    kent_table_cell(t, "%s", name);
    kent_table_cell(t, "%s", what);
    kent_table_cell(t, "%s", kent_shown_with_unit(kind, page->units, e->lowest).text);
    kent_table_cell(t, "%s", kent_shown_number(e->lowest_at, 1).text);
    kent_table_cell(t, "%s", kent_shown_with_unit(kind, page->units, e->highest).text);
    kent_table_cell(t, "%s", kent_shown_number(e->highest_at, 1).text);
}

static void device_rows(const kent_page *page, const kent_scenario_result *run,
                        size_t device, kent_table *t)
{
    const kent_model *m = page->model;
    const kent_device *d = &m->devices[device];
    const kent_device_quantity *q = kent_device_quantities(d->kind);
    const kent_device_extreme *e = &run->devices[device];
    char name[2 * KENT_ID + 40];
    (void)snprintf(name, sizeof name, "%s %s", kent_device_word(d->kind),
                   kent_device_name(m, device).s);
    if (kent_device_is_left_out(m, device, run->scenario)) {
        const char *const cells[] = {name, "left out", "", "", "", ""};
        for (size_t i = 0; i < sizeof cells / sizeof cells[0]; i++) {
            kent_table_cell(t, "%s", cells[i]);
        }
        return;
    }
    swing_row(page, name, "flow", KENT_FLOW, &e->flow, t);
    for (int j = 0; j < KENT_TOLD && q[j].name; j++) {
        if (e->told[j].highest == e->told[j].lowest) continue; /* it never moved */
        swing_row(page, "", q[j].word, q[j].kind, &e->told[j], t);
    }
}

static void print_devices(kent_page *page, const kent_scenario_result *run)
{
    static const kent_column COLUMNS[] = {
        {"device", "", KENT_ALIGN_LEFT, true},    {"", "", KENT_ALIGN_LEFT, false},
        {"lowest", "", KENT_ALIGN_RIGHT, false},  {"at s", "", KENT_ALIGN_RIGHT, false},
        {"highest", "", KENT_ALIGN_RIGHT, false}, {"at s", "", KENT_ALIGN_RIGHT, false},
    };
    enum { COUNT = sizeof COLUMNS / sizeof COLUMNS[0] };
    const kent_model *m = page->model;
    kent_table t = {.columns = COLUMNS, .column_count = COUNT};
    kent_text heading = {0};
    size_t left = 0;
    for (size_t i = 0; i < m->device_count; i++) {
        if (!is_shown(m, run, i)) continue;
        if (!page->wide && t.cell_count / COUNT >= DEVICE_ROWS) {
            left++;
        } else {
            device_rows(page, run, i, &t);
        }
    }
    kent_text_add(&heading, "Devices in %s", name_of(page, run).s);
    if (left > 0) kent_text_add(&heading, " (%zu more with --wide)", left);
    kent_page_finish(page, kent_text_of(&heading), &t);
    page->out->failed = page->out->failed || heading.failed;
    kent_text_clear(&heading);
}

void kent_page_devices(kent_page *page)
{
    const kent_results *r = page->results;
    for (size_t i = 0; i < r->scenario_count; i++) {
        print_devices(page, &r->scenarios[i]);
    }
}

/* ---- cavities -------------------------------------------------------------------- */

static void cavity_row(const kent_page *page, const kent_scenario_result *run,
                       const kent_cavity *c, kent_table *t)
{
    const kent_model *m = page->model;
    kent_table_cell(t, "%s", name_of(page, run).s);
    if (c->node >= 0) {
        kent_table_cell(t, "%s", m->points[m->nodes[c->node].point].id);
    } else {
        kent_table_cell(t, "%s, %s", m->spans[c->span].id,
                        kent_said_whole(KENT_LENGTH, page->units, c->chainage).s);
    }
    kent_table_cell(t, "%s", kent_shown_number(c->opened, 1).text);
    kent_table_cell(t, "%s", kent_parting_volume(page->units, c->largest).s);
    kent_table_cell(t, "%s", kent_shown_number(c->largest_at, 1).text);
    kent_table_cell(t, "%s", kent_shown_number(c->closed, 1).text);
    kent_table_cell(t, "%d", c->count);
    kent_table_cell(t, "%s",
                    kent_shown_quantity(KENT_LENGTH, page->units, c->pulse).text);
}

void kent_page_cavities(kent_page *page)
{
    const char *m = kent_units_display(KENT_LENGTH, page->units).unit;
    const kent_column columns[] = {
        {"in", "", KENT_ALIGN_LEFT, true},
        {"at", "", KENT_ALIGN_LEFT, true},
        {"opens", "s", KENT_ALIGN_RIGHT, false},
        {"largest", "", KENT_ALIGN_RIGHT, false},
        {"at", "s", KENT_ALIGN_RIGHT, false},
        {"closes", "s", KENT_ALIGN_RIGHT, false},
        {"times", "", KENT_ALIGN_RIGHT, false},
        {"pulse", m, KENT_ALIGN_RIGHT, false},
    };
    const kent_results *r = page->results;
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    size_t left = 0;
    for (size_t i = 0; i < r->scenario_count; i++) {
        const kent_scenario_result *run = &r->scenarios[i];
        for (size_t k = 0; k < run->cavity_count; k++) {
            if (!page->wide && k >= CAVITY_ROWS) {
                left += run->cavity_count - k;
                break;
            }
            cavity_row(page, run, &run->cavities[k], &t);
        }
    }
    kent_text heading = {0};
    kent_text_add(&heading, "Cavities, the largest first");
    if (left > 0) kent_text_add(&heading, " (%zu more with --wide)", left);
    kent_page_finish(page, kent_text_of(&heading), &t);
    page->out->failed = page->out->failed || heading.failed;
    kent_text_clear(&heading);
}
