#include "kent_parting.h"

#include "kent_said.h"

#include <math.h>
#include <stdio.h>

enum { NAMED = 6 }; /* places told of one caution; the rest are counted */

static kent_name name_of(const kent_model *m, const kent_scenario_result *run)
{
    return kent_name_in_state(m, m->scenarios[run->scenario].id, run->state);
}

kent_said kent_parting_volume(kent_system system, double volume)
{
    static const double LITRE = 1e-3, GALLON = 3.785411784e-3; /* m3 */
    kent_said said;
    if (system == KENT_US) {
        (void)snprintf(said.s, sizeof said.s, "%.3g gal", volume / GALLON);
    } else {
        (void)snprintf(said.s, sizeof said.s, "%.3g L", volume / LITRE);
    }
    return said;
}

/* ---- taking ---------------------------------------------------------------------- */

static void fill(double *hollow, int point, double volume)
{
    hollow[point] = fmax(hollow[point], volume);
}

/* The points of a route that lie within one reach of a cavity. */
static void fill_along(const kent_model *m, const kent_grid *grid, double *hollow,
                       const kent_cavity *c)
{
    const kent_span *span = &m->spans[c->span];
    const double reach = span->length / grid->reaches[c->span];
    const double start = m->chainage[span->route_first];
    for (size_t i = 0; i < span->route_count; i++) {
        const size_t at = span->route_first + i;
        const double gap = fabs(m->chainage[at] - start - c->chainage);
        if (gap < reach) fill(hollow, m->route[at], c->largest);
    }
}

kent_status kent_parting_take(const kent_model *m, const kent_grid *grid,
                              const kent_marcher *march, kent_scenario_result *out,
                              kent_error *err)
{
    const size_t count = kent_marcher_cavities(march, NULL, 0);
    out->cavities = kent_alloc(count, sizeof *out->cavities);
    out->hollow = kent_alloc(m->point_count, sizeof *out->hollow);
    if (!out->cavities || !out->hollow) return kent_error_nomem(err);
    out->cavity_count = kent_marcher_cavities(march, out->cavities, count);
    for (size_t i = 0; i < count; i++) {
        const kent_cavity *c = &out->cavities[i];
        if (c->node >= 0) {
            fill(out->hollow, m->nodes[c->node].point, c->largest);
        } else {
            fill_along(m, grid, out->hollow, c);
        }
    }
    return KENT_OK;
}

/* ---- judging --------------------------------------------------------------------- */

/* "B, C and 3 more"; else the pipe where no point is near. */
static void name_places(const kent_model *m, const kent_scenario_result *run,
                        kent_text *where)
{
    size_t named = 0;
    for (size_t i = 0; i < m->point_count; i++) {
        if (!(run->hollow[i] > 0.0)) continue;
        if (named < NAMED) {
            kent_text_add(where, named ? ", %s" : " at or next to %s", m->points[i].id);
        }
        named++;
    }
    if (named > NAMED) kent_text_add(where, " and %zu more", named - NAMED);
    if (named > 0) return;
    const kent_cavity *c = &run->cavities[0];
    kent_text_add(where, " in %s, %s from its start", m->spans[c->span].id,
                  kent_said_of(KENT_LENGTH, m->units, c->chainage).s);
}

/* m: the largest rise of head on any collapse; NAN: none yet. */
static double largest_pulse(const kent_scenario_result *run)
{
    double pulse = NAN;
    for (size_t i = 0; i < run->cavity_count; i++) {
        pulse = fmax(pulse, run->cavities[i].pulse);
    }
    return pulse;
}

static void judge_run(kent_results *r, const kent_scenario_result *run)
{
    const kent_model *m = r->model;
    const kent_cavity *c = &run->cavities[0];
    const double pulse = largest_pulse(run);
    kent_text where = {0}, closes = {0};
    name_places(m, run, &where);
    if (isnan(pulse)) {
        kent_text_add(&closes, "none has closed yet: run it longer");
    } else {
        kent_text_add(&closes, "when one closes the head rises by up to %s",
                      kent_said_of(KENT_LENGTH, m->units, pulse).s);
    }
    kent_notes_warn(&r->cautions,
                    "%s: the water parts%s; the largest cavity takes %s, at %.3g s; %s",
                    name_of(m, run).s, kent_text_of(&where),
                    kent_parting_volume(m->units, c->largest).s, c->largest_at,
                    kent_text_of(&closes));
    r->cautions.failed = r->cautions.failed || where.failed || closes.failed;
    kent_text_clear(&where);
    kent_text_clear(&closes);
}

static void caution_parted(kent_results *r, const kent_scenario_result *run)
{
    const kent_model *m = r->model;
    for (size_t i = 0; r->restraints && i < m->fitting_count; i++) {
        const int point = m->fittings[i].point;
        kent_notes *cautions = &r->restraints->fittings[i].cautions;
        if (point < 0 || !(run->hollow[point] > 0.0)) continue;
        kent_notes_warn(
            cautions, "%s: the water parts at or next to it: a cavity of up to %s",
            name_of(m, run).s, kent_parting_volume(m->units, run->hollow[point]).s);
        r->cautions.failed = r->cautions.failed || cautions->failed;
    }
}

/* s: the first that closed; INFINITY: none has. */
static double first_closing(const kent_scenario_result *run)
{
    double first = INFINITY;
    for (size_t i = 0; i < run->cavity_count; i++) {
        first = fmin(first, run->cavities[i].closed);
    }
    return first;
}

/* The load case that governs a fitting, where it is of this march; else NULL. */
static const kent_load_case *
governing_case(const kent_results *r, const kent_scenario_result *run, size_t fitting)
{
    const int governing = r->restraints->fittings[fitting].governing;
    if (governing < 0) return NULL;
    const kent_load_case *c = &r->loads->fittings[fitting].cases[governing];
    return c->scenario == run->scenario && c->state == run->state ? c : NULL;
}

static void caution_pulse(kent_results *r, const kent_scenario_result *run)
{
    const double first = first_closing(run);
    for (size_t i = 0; r->restraints && r->loads && i < r->model->fitting_count; i++) {
        const kent_load_case *c = governing_case(r, run, i);
        const double time = c ? c->worst[KENT_RESULTANT].time : NAN;
        if (!c || !(time >= first)) continue;
        kent_notes *cautions = &r->restraints->fittings[i].cautions;
        char stays[64] = ""; /* not known of a valve that is shut on the peak */
        if (!isnan(c->above_90_percent)) {
            (void)snprintf(stays, sizeof stays,
                           "it stays above 90 %% of itself for %.3f s, and ",
                           c->above_90_percent);
        }
        kent_notes_warn(
            cautions,
            "the governing peak, '%s' at %.4g s, comes after a cavity closed "
            "(the first at %.4g s): %ssuch peaks hang on how cavities are "
            "modelled",
            c->title.s, time, first, stays);
        r->cautions.failed = r->cautions.failed || cautions->failed;
    }
}

void kent_parting_judge(kent_results *r, const kent_scenario_result *run)
{
    if (run->cavity_count == 0) return;
    judge_run(r, run);
    if (r->model->scenarios[run->scenario].for_comparison) return;
    caution_parted(r, run);
    caution_pulse(r, run);
}
