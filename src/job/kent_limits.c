#include "kent_limits.h"

#include "kent_overload.h"
#include "kent_parting.h"
#include "kent_said.h"

#include <math.h>

enum { NAMED = 6 }; /* places told of one caution; the rest are counted */

/* A peak in the last 2 % of the duration may not be the last word. */
static const double LATE_SHARE = 0.02;

static kent_name name_of(const kent_model *m, const kent_scenario_result *run)
{
    return kent_name_in_state(m, m->scenarios[run->scenario].id, run->state);
}

/* On every fitting that the low pressure touches. */
static void caution_touched(kent_results *r, const kent_scenario_result *run)
{
    const kent_model *m = r->model;
    for (size_t i = 0; r->restraints && i < m->fitting_count; i++) {
        const int point = m->fittings[i].point;
        kent_notes *cautions = &r->restraints->fittings[i].cautions;
        if (point < 0 || !run->touched[point]) continue;
        kent_notes_add(cautions,
                       "%s: the pressure falls below the vapour limit at or next to "
                       "it; what follows is not to be relied on",
                       name_of(m, run).s);
        r->cautions.failed = r->cautions.failed || cautions->failed;
    }
}

static void judge_vapour(kent_results *r, const kent_scenario_result *run)
{
    const kent_model *m = r->model;
    if (run->below_vapour == 0) return;
    kent_text where = {0};
    size_t named = 0;
    for (size_t i = 0; i < m->point_count; i++) {
        if (!run->touched[i]) continue;
        if (named < NAMED) {
            kent_text_add(&where, named ? ", %s" : "%s", m->points[i].id);
        }
        named++;
    }
    if (named > NAMED) kent_text_add(&where, " and %zu more", named - NAMED);
    kent_notes_add(
        &r->cautions,
        m->solver.column_separation == KENT_SEPARATION_NONE
            ? "%s: the pressure falls below the vapour limit at or next to %s; "
              "cavities "
              "are switched off (column_separation), so pressures after that instant "
              "are not to be relied on there"
            : "%s: the pressure is below the vapour limit at or next to %s before "
              "anything happens: no full pipe flows so, and what follows is not to be "
              "relied on there",
        name_of(m, run).s, kent_text_of(&where));
    kent_text_clear(&where);
    if (m->scenarios[run->scenario].for_comparison) return;
    caution_touched(r, run);
}

static void judge_lateness(kent_results *r, const kent_scenario_result *run)
{
    const kent_model *m = r->model;
    const kent_scenario *s = &m->scenarios[run->scenario];
    const double late = (1.0 - LATE_SHARE) * s->duration;
    int highest = -1;
    for (size_t i = 0; i < m->point_count; i++) {
        if (!isfinite(run->points[i].highest_head)) continue;
        if (highest < 0 ||
            run->points[i].highest_head > run->points[highest].highest_head) {
            highest = (int)i;
        }
    }
    if (highest < 0) return;
    const kent_peak *peak = &run->points[highest];
    const double swing = peak->highest_head - peak->lowest_head;
    if (peak->highest_at < late || swing < 1e-6) return;
    kent_notes_add(
        &r->cautions,
        "%s: the highest head (at %s) comes at %.1f s of %.1f s: run it longer",
        name_of(m, run).s, m->points[highest].id, peak->highest_at, s->duration);
}

/* One sentence for all: a street main has many short spans. */
static void judge_devices(kent_results *r, const kent_scenario_result *run)
{
    const kent_model *m = r->model;
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        if (!run->devices[i].caution) continue;
        kent_notes_add(&r->cautions, "%s: %s \"%s\" %s", name_of(m, run).s,
                       kent_device_word(d->kind), d->id, run->devices[i].caution);
    }
}

static void judge_grid(kent_results *r, const kent_scenario_result *run)
{
    const kent_model *m = r->model;
    const kent_grid *grid = run->grid;
    kent_text spans = {0};
    size_t count = 0, worst = 0;
    double most = 0.0; /* logarithm of how far a wave speed is moved */

    for (size_t i = 0; i < m->span_count; i++) {
        if (!grid->misses[i]) continue;
        const double moved =
            fabs(log(grid->wave_speed_used[i] / m->spans[i].wave_speed));
        if (moved > most) worst = i;
        most = fmax(most, moved);
        if (count < NAMED) kent_text_add(&spans, count ? ", %s" : "%s", m->spans[i].id);
        count++;
    }
    if (count > NAMED) kent_text_add(&spans, " and %zu more", count - NAMED);
    if (count > 0) {
        kent_notes_add(
            &r->cautions,
            "%s %s %s not fit the common step: the wave speed %s%s%s is marched as %s "
            "(inertia kept)%s",
            count > 1 ? "spans" : "span", kent_text_of(&spans),
            count > 1 ? "do" : "does",
            kent_said_whole(KENT_SPEED, m->units, m->spans[worst].wave_speed).s,
            count > 1 ? " of " : "", count > 1 ? m->spans[worst].id : "",
            kent_said_whole(KENT_SPEED, m->units, grid->wave_speed_used[worst]).s,
            count > 1 ? ", those of the others are moved by less" : "");
    }
    r->cautions.failed = r->cautions.failed || spans.failed;
    kent_text_clear(&spans);
}

/* What is marched beside another must not look as if it were judged. */
static void say_compared(kent_results *r)
{
    for (size_t i = 0; i < r->scenario_count; i++) {
        const kent_scenario *s = &r->model->scenarios[r->scenarios[i].scenario];
        if (!s->for_comparison) continue;
        kent_notes_add(&r->cautions,
                       "%s is for comparison: it decides no load case and no limit",
                       s->id);
    }
}

/* What was built is judged by its own command; a run must not pass it in silence. */
static void judge_built(kent_results *r)
{
    const kent_restraints *held = r->restraints;
    kent_text short_of = {0};
    size_t count = 0;

    for (size_t i = 0; held && i < held->fitting_count; i++) {
        const kent_as_built *b = &held->fittings[i].as_built;
        if (!b->stated || !b->falls_short) continue;
        kent_text_add(&short_of, "%s%s", count++ > 0 ? ", " : "",
                      r->model->fittings[i].id);
    }
    if (count > 0) {
        r->limit_exceeded = true;
        kent_notes_warn(&r->cautions,
                        "what was built at %s reaches less than is asked, or something "
                        "of it cannot be told: see kentledge as-built",
                        kent_text_of(&short_of));
    }
    r->cautions.failed = r->cautions.failed || short_of.failed;
    kent_text_clear(&short_of);
}

void kent_limits_judge(kent_results *r)
{
    say_compared(r);
    kent_overload_judge(r);
    if (r->loads) kent_site_test_caution(r->model, &r->loads->test, &r->cautions);
    for (size_t i = 0; i < r->scenario_count; i++) {
        judge_vapour(r, &r->scenarios[i]);
        kent_parting_judge(r, &r->scenarios[i]);
        judge_devices(r, &r->scenarios[i]);
        judge_lateness(r, &r->scenarios[i]);
        if (i == 0) judge_grid(r, &r->scenarios[i]);
    }
    if (r->restraints && r->restraints->not_held > 0) r->limit_exceeded = true;
    judge_built(r);
}
