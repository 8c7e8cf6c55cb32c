/* Figures for a hand check, and how far plastics are swung. */
#include "kent_page.h"
#include "kent_screen.h"
#include "kent_shown.h"
#include "kent_tiring.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

enum { MOVED = 40, TIRED = 12 }; /* rows, at most */

/* ---- screening ------------------------------------------------------------------- */

static const char *moved_id(const kent_model *m, const kent_screen *s)
{
    switch (s->kind) {
    case KENT_EVENT_VALVE:
        return m->valves[s->target].id;
    case KENT_EVENT_PUMP:
        return m->pumps[s->target].id;
    case KENT_EVENT_OUTFLOW:
    case KENT_EVENT_FIXED_LEVEL:
    case KENT_EVENT_BURST:
        break;
    }
    return m->points[s->point].id;
}

static void quantity(const kent_page *page, kent_kind kind, double si, kent_table *t)
{
    kent_table_cell(t, "%s", kent_shown_quantity(kind, page->units, si).text);
}

static void screen_row(const kent_page *page, const kent_scenario_result *run,
                       const kent_screen *s, kent_table *t)
{
    const kent_model *m = page->model;
    const double one = page->units == KENT_US ? 0.3048 : 1.0; /* m/s */
    const char *id = m->scenarios[run->scenario].id;
    kent_table_cell(t, "%s", kent_name_in_state(m, id, run->state).s);
    kent_table_cell(t, "%s", moved_id(m, s));
    quantity(page, KENT_SPEED, fabs(s->velocity), t);
    quantity(page, KENT_PRESSURE, one * s->per_velocity, t);
    quantity(page, KENT_PRESSURE, s->sudden, t);
    kent_table_cell(t, "%s", kent_shown_number(s->return_time, 2).text);
    kent_table_cell(t, "%s",
                    s->end_point >= 0 ? m->points[s->end_point].id : KENT_SHOWN_NONE);
    kent_table_cell(t, "%s", kent_shown_number(s->time, 2).text);
    quantity(page, KENT_PRESSURE, s->slow, t);
    quantity(page, KENT_PRESSURE, s->linear, t);
    quantity(page, KENT_PRESSURE, s->rise, t);
    quantity(page, KENT_PRESSURE, s->fall, t);
}

void kent_page_screening(kent_page *page)
{
    const char *bar = kent_units_display(KENT_PRESSURE, page->units).unit;
    const char *speed = kent_units_display(KENT_SPEED, page->units).unit;
    const char *one = page->units == KENT_US ? "of 1 ft/s" : "of 1 m/s";
    const kent_column columns[] = {
        {"in", "", KENT_ALIGN_LEFT, true},
        {"moves", "", KENT_ALIGN_LEFT, true},
        {"dV", speed, KENT_ALIGN_RIGHT, false},
        {one, bar, KENT_ALIGN_RIGHT, false},
        {"a dV/g", bar, KENT_ALIGN_RIGHT, false},
        {"2L/a", "s", KENT_ALIGN_RIGHT, false},
        {"to", "", KENT_ALIGN_LEFT, true},
        {"T", "s", KENT_ALIGN_RIGHT, false},
        {"Michaud", bar, KENT_ALIGN_RIGHT, false},
        {"linear", bar, KENT_ALIGN_RIGHT, false},
        {"rise", bar, KENT_ALIGN_RIGHT, false},
        {"fall", bar, KENT_ALIGN_RIGHT, false},
    };
    const kent_results *r = page->results;
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    kent_screen s[MOVED];
    for (size_t i = 0; i < r->scenario_count; i++) {
        const size_t count = kent_screen_of(r, i, s, MOVED, &page->out->failed);
        for (size_t k = 0; k < count && k < MOVED; k++) {
            screen_row(page, &r->scenarios[i], &s[k], &t);
        }
    }
    const bool any = t.cell_count > 0;
    kent_page_finish(page, "For a hand check: not what was computed", &t);
    if (!any) return;
    kent_table_paragraph(
        page->out, page->limit, "",
        "dV: the largest change of velocity in the widest pipe there. 2L/a: to the "
        "nearest fixed level, surge tank, vessel or much larger junction (named). T: "
        "the "
        "time from 10 to 90 % of the change of flow that the march found, over 0.8. "
        "Michaud 2LdV/(gT) and the linear rule know one even change in one pipe "
        "without "
        "friction, and can come out too low. Rise and fall: the march, at what moves.");
}

/* ---- swings of plastics ---------------------------------------------------------- */

/* The old British rule for PVC-U: swings below half of the rating are no matter. */
static const double OLD_SHARE = 0.5;

static void swing_row(const kent_page *page, const kent_scenario_result *run,
                      size_t pipe, const kent_tiring *s, kent_table *t)
{
    const kent_model *m = page->model;
    const kent_pipe *p = &m->pipes[pipe];
    const double swing = s->highest - s->lowest;
    kent_table_cell(t, "%s", m->scenarios[run->scenario].id);
    kent_table_cell(t, "%s %s", p->material[0] ? p->material : "plastic", p->id);
    kent_table_cell(t, "%s", s->point >= 0 ? m->points[s->point].id : "along it");
    quantity(page, KENT_PRESSURE, s->amplitude, t);
    quantity(page, KENT_PRESSURE, s->mean, t);
    if (isnan(s->cycles)) {
        kent_table_cell(t, "%s", KENT_SHOWN_NONE);
    } else {
        kent_table_cell(t, "%.3g", s->cycles);
    }
    kent_table_cell(t, "%s", kent_shown_number(swing / s->rating, 2).text);
}

void kent_page_swings(kent_page *page)
{
    const char *bar = kent_units_display(KENT_PRESSURE, page->units).unit;
    const kent_column columns[] = {
        {"in", "", KENT_ALIGN_LEFT, true},
        {"pipe", "", KENT_ALIGN_LEFT, true},
        {"at", "", KENT_ALIGN_LEFT, true},
        {"amplitude", bar, KENT_ALIGN_RIGHT, false},
        {"mean", bar, KENT_ALIGN_RIGHT, false},
        {"times in its life", "", KENT_ALIGN_RIGHT, false},
        {"swing / rating", "", KENT_ALIGN_RIGHT, false},
    };
    const kent_results *r = page->results;
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < r->scenario_count; i++) {
        size_t rows = 0;
        for (size_t p = 0; p < r->model->pipe_count; p++) {
            kent_tiring s;
            if (!kent_tiring_of(r, i, p, &s)) continue;
            if (page->wide || rows < TIRED) {
                swing_row(page, &r->scenarios[i], p, &s, &t);
            }
            rows++;
        }
    }
    const bool any = t.cell_count > 0;
    kent_page_finish(page, "Swings of plastic pipes by surges that recur", &t);
    if (!any) return;
    kent_text words = {0};
    kent_text_add(
        &words,
        "Information, no judgement: whether PVC bears so many swings is for the "
        "maker's "
        "cyclic design (amplitude, mean and count: PVC Pipe Association, Folkman and "
        "Parvez). An old British rule (BS CP 312, as summarised) asked of PVC that a "
        "swing stay below %.1f of the rating. One swing a time is counted; those that "
        "follow it are not.",
        OLD_SHARE);
    kent_page_say(page, "", &words);
}
