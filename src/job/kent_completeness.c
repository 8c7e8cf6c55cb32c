#include "kent_completeness.h"

#include "kent_said.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static const struct {
    const char *what, *missing;
} ASKED[KENT_NEEDED_CASES] = {
    [KENT_NEEDS_TEST] = {"test",
                         "no site test is among the load cases; give test_pressure or "
                         "test_rule in loads"},
    [KENT_NEEDS_STATIC] = {"static",
                           "no fixed level stands over the main, so that still water "
                           "is no load case; give static_level in loads"},
    [KENT_NEEDS_SHUT_OFF] =
        {"shut-off", "pumps are there, but no fitting has their head at no flow "
                     "among its load cases"},
    [KENT_NEEDS_SURGE] = {"surge",
                          "no scenario that decides was run, so that no surge is among "
                          "the load cases; add one to scenarios"},
};

static bool has_case(const kent_results *r, kent_case_kind kind)
{
    for (size_t i = 0; i < r->loads->fitting_count; i++) {
        const kent_fitting_loads *loads = &r->loads->fittings[i];
        for (size_t k = 0; k < loads->count; k++) {
            if (loads->cases[k].kind == kind && !loads->cases[k].later) return true;
        }
    }
    return r->loads->fitting_count == 0;
}

static bool surge_was_run(const kent_results *r)
{
    for (size_t i = 0; i < r->scenario_count; i++) {
        if (!r->model->scenarios[r->scenarios[i].scenario].for_comparison) return true;
    }
    return false;
}

static bool is_present(const kent_results *r, kent_needed_case what)
{
    switch (what) {
    case KENT_NEEDS_TEST:
        return isfinite(r->loads->test.pressure);
    case KENT_NEEDS_STATIC:
        return has_case(r, KENT_CASE_STATIC);
    case KENT_NEEDS_SHUT_OFF:
        return has_case(r, KENT_CASE_SHUT_OFF);
    case KENT_NEEDS_SURGE:
        return surge_was_run(r);
    case KENT_NEEDED_CASES:
        break;
    }
    return true;
}

static const char *waived(const kent_model *m, const char *what)
{
    for (size_t i = 0; i < m->waiver_count; i++) {
        if (strcmp(m->waivers[i].what, what) == 0) return m->waivers[i].reason;
    }
    return NULL;
}

void kent_completeness_judge(kent_results *r)
{
    const kent_model *m = r->model;

    for (int k = 0; k < KENT_NEEDED_CASES; k++) {
        kent_needed *n = &r->completeness[k];
        const bool pumps = k != KENT_NEEDS_SHUT_OFF || m->pump_count > 0;
        *n = (kent_needed){.what = ASKED[k].what, .asked = pumps && m->span_count > 0};
        if (!n->asked) continue;
        n->present = is_present(r, (kent_needed_case)k);
        n->waived = waived(m, n->what);
        if (n->present) continue;
        if (n->waived) {
            kent_notes_add(&r->cautions, "done without the load case %s: %s", n->what,
                           n->waived);
        } else {
            r->incomplete = true;
            kent_notes_warn(&r->cautions,
                            "not complete: %s, or say why not by waived = ( ( \"%s\", "
                            "\"...\" ) ) in loads",
                            ASKED[k].missing, n->what);
        }
    }
}

/* ---- the test and the surge ------------------------------------------------------ */

/* How far a march goes above the test somewhere, and where. */
typedef struct kent_excess {
    double above, reached; /* Pa */
    double x;              /* m from the span's start */
    int span;
    size_t march; /* of the results */
} kent_excess;

/* Pa, of the site test at a level (m). */
static double test_at(const kent_results *r, double level)
{
    const kent_model *m = r->model;
    const kent_site_test *t = &r->loads->test;
    const double gauge = t->gauge >= 0 ? m->points[t->gauge].at.z : level;

    return t->pressure + m->water.density * m->gravity * (gauge - level);
}

static void excess_of_span(const kent_results *r, size_t march, int index,
                           kent_excess *most)
{
    const kent_scenario_result *run = &r->scenarios[march];
    const kent_span *span = &r->model->spans[index];
    const int reaches = run->grid->reaches[index];

    for (int n = 0; n <= reaches; n++) {
        const double x = span->length * (double)n / (double)reaches;
        const double level = kent_span_level(r->model, span, x);
        const double p = kent_model_pressure(r->model, run->highest[index][n], level);
        const double above = p - test_at(r, level);
        if (above > most->above) *most = (kent_excess){above, p, x, index, march};
    }
}

void kent_completeness_test(kent_results *r)
{
    static const double SLACK = 100.0; /* Pa */
    const kent_model *m = r->model;
    kent_excess most = {.above = SLACK, .span = -1};

    if (isnan(r->loads->test.pressure)) return;
    for (size_t i = 0; i < r->scenario_count; i++) {
        if (m->scenarios[r->scenarios[i].scenario].for_comparison) continue;
        for (size_t s = 0; s < m->span_count; s++) {
            excess_of_span(r, i, (int)s, &most);
        }
    }
    if (most.span < 0) return;
    const kent_scenario_result *run = &r->scenarios[most.march];
    const kent_name name =
        kent_name_in_state(m, m->scenarios[run->scenario].id, run->state);
    kent_notes_warn(
        &r->cautions,
        "the site test is below the surge: %s reaches %s in pipe %s, %s from "
        "its start, where the test brings %s; it does not prove the main and "
        "its restraints for that",
        name.s, kent_said_of(KENT_PRESSURE, m->units, most.reached).s,
        m->spans[most.span].id, kent_said_whole(KENT_LENGTH, m->units, most.x).s,
        kent_said_of(KENT_PRESSURE, m->units, most.reached - most.above).s);
}
