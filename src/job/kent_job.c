#include "kent_job.h"

#include "kent_alarm.h"
#include "kent_completeness.h"
#include "kent_limit_table.h"
#include "kent_limits.h"
#include "kent_overload.h"
#include "kent_scenario_run.h"

#include <assert.h>
#include <stdlib.h>
#include <unistd.h>

/* The two grids of a march: as planned, and with every reach halved. */
enum { COARSE, FINE, GRIDS };

typedef struct kent_march_plan {
    const kent_model *model;
    kent_results *results;
    kent_recorder *recorder;
    kent_viewpoints *views;
    kent_grid *grid[GRIDS];       /* FINE: NULL without a grid check */
    int *marches;                 /* [scenario_count] of the model's, by result */
    kent_scenario_result *coarse; /* [scenario_count], peaks only */
    kent_error *errors;           /* [jobs] */
    kent_status *statuses;        /* [jobs] */
    bool one_grid;
} kent_march_plan;

static size_t plan_grids(const kent_march_plan *plan)
{
    return plan->grid[FINE] ? 2 : 1;
}

/* Job 2 i (or i) is march i on the grid whose figures are printed; the long job
 * comes first so that threads end together. */
static void march_job(void *context, size_t index)
{
    kent_march_plan *plan = context;
    const size_t grids = plan_grids(plan), i = index / grids;
    const bool printed = index % grids == 0;
    kent_scenario_result *out =
        printed ? &plan->results->scenarios[i] : &plan->coarse[i];
    const kent_scenario_run run = {
        .steady = plan->results->steadies[plan->results->scenarios[i].state],
        .views = plan->views,
        .grid = plan->grid[printed && grids == 2 ? FINE : COARSE],
        .march = plan->marches[i],
        .recorder = printed ? plan->recorder : NULL,
    };
    plan->statuses[index] = kent_scenario_run_march(&run, out, &plan->errors[index]);
}

/* m: the whole difference between two grids, at the point where it is largest. */
static double grid_band(const kent_model *m, const kent_peak *a, const kent_peak *b)
{
    double band = 0.0;
    for (size_t i = 0; i < m->point_count; i++) {
        if (!isfinite(a[i].highest_head)) continue;
        band = fmax(band, fabs(a[i].highest_head - b[i].highest_head));
        band = fmax(band, fabs(a[i].lowest_head - b[i].lowest_head));
    }
    return band;
}

static kent_status plan_make_grids(kent_march_plan *plan, kent_error *err)
{
    const kent_model *m = plan->model;
    double longest = 0.0;
    for (size_t i = 0; i < plan->results->scenario_count; i++) {
        longest =
            fmax(longest, m->scenarios[plan->results->scenarios[i].scenario].duration);
    }
    kent_status status = kent_grid_plan(m, longest, &plan->grid[COARSE], err);
    if (!status && m->solver.grid_check && !plan->one_grid) {
        status = kent_grid_refine(plan->grid[COARSE], m->span_count, 2,
                                  &plan->grid[FINE], err);
    }
    return status;
}

/* Each scenario result owns a copy of the grid it was marched on. */
static kent_status give_grids(kent_march_plan *plan, kent_error *err)
{
    const kent_grid *used = plan->grid[FINE] ? plan->grid[FINE] : plan->grid[COARSE];
    for (size_t i = 0; i < plan->results->scenario_count; i++) {
        const kent_status status = kent_grid_refine(
            used, plan->model->span_count, 1, &plan->results->scenarios[i].grid, err);
        if (status) return status;
    }
    return KENT_OK;
}

/* What stopped a job, and in which scenario: others may run. */
static kent_status stopped_in(const kent_march_plan *plan, size_t job, kent_error *err)
{
    const kent_error *cause = &plan->errors[job];
    const kent_scenario_result *s = &plan->results->scenarios[job / plan_grids(plan)];
    const char *id = plan->model->scenarios[s->scenario].id;
    const kent_name name = kent_name_in_state(plan->model, id, s->state);
    return kent_error_set(err, plan->statuses[job], cause->where, "scenario %s: %s",
                          name.s, cause->what);
}

static kent_status march_all(kent_march_plan *plan, unsigned threads, kent_error *err)
{
    kent_results *r = plan->results;
    kent_status status = plan_make_grids(plan, err);
    if (status) return status;
    const size_t jobs = r->scenario_count * plan_grids(plan);
    plan->coarse = kent_alloc(r->scenario_count, sizeof *plan->coarse);
    plan->errors = kent_alloc(jobs, sizeof *plan->errors);
    plan->statuses = kent_alloc(jobs, sizeof *plan->statuses);
    if (!plan->coarse || !plan->errors || !plan->statuses) return kent_error_nomem(err);

    kent_queue_run(jobs, threads, march_job, plan);
    for (size_t j = 0; j < jobs; j++) {
        if (!plan->statuses[j]) continue;
        return stopped_in(plan, j, err);
    }
    for (size_t i = 0; i < r->scenario_count; i++) {
        r->scenarios[i].uncertainty =
            plan->grid[FINE]
                ? grid_band(plan->model, r->scenarios[i].points, plan->coarse[i].points)
                : NAN;
    }
    return give_grids(plan, err);
}

static void plan_clear(kent_march_plan *plan)
{
    for (size_t i = 0; plan->coarse && i < plan->results->scenario_count; i++) {
        kent_scenario_result_clear(&plan->coarse[i], plan->model->span_count);
    }
    free(plan->marches);
    free(plan->coarse);
    free(plan->errors);
    free(plan->statuses);
    kent_grid_free(plan->grid[COARSE]);
    kent_grid_free(plan->grid[FINE]);
    kent_viewpoints_free(plan->views);
    kent_recorder_free(plan->recorder);
}

/* Marches of the scenarios asked for: in the order asked, and by state. */
static kent_status choose_marches(kent_march_plan *plan,
                                  const kent_job_options *options, kent_error *err)
{
    const kent_model *m = plan->model;
    kent_results *r = plan->results;
    const bool all = options->scenarios == NULL;
    const size_t asked = all ? m->scenario_count : options->scenario_count;
    r->scenarios = kent_alloc(m->march_count, sizeof *r->scenarios);
    plan->marches = kent_alloc(m->march_count, sizeof *plan->marches);
    if (!r->scenarios || !plan->marches) return kent_error_nomem(err);
    for (size_t i = 0; i < asked; i++) {
        const int scenario = all ? (int)i : options->scenarios[i];
        for (size_t k = 0; k < m->march_count; k++) {
            if (m->marches[k].scenario != scenario) continue;
            assert(r->scenario_count < m->march_count);
            kent_scenario_result *out = &r->scenarios[r->scenario_count];
            plan->marches[r->scenario_count++] = (int)k;
            out->scenario = scenario;
            out->uncertainty = NAN;
            out->state = m->marches[k].state;
        }
    }
    return KENT_OK;
}

static kent_status solve_states(const kent_model *m, kent_results *r, kent_error *err)
{
    r->steadies = kent_alloc(m->state_count, sizeof(kent_steady *));
    if (!r->steadies) return kent_error_nomem(err);
    r->steady_count = m->state_count;
    return kent_steady_solve_states(m, r->steadies, err);
}

static kent_status name_histories(const kent_viewpoints *v, kent_results *r,
                                  kent_error *err)
{
    r->history_points = kent_alloc(v->history_count, sizeof *r->history_points);
    if (!r->history_points) return kent_error_nomem(err);
    for (size_t i = 0; i < v->history_count; i++) {
        r->history_points[i] = v->views[v->history[i]].point;
    }
    r->history_count = v->history_count;
    if (v->history_cut) {
        kent_notes_add(&r->cautions, "histories are kept of the first %d places only",
                       KENT_HISTORY_PLACES);
    }
    return KENT_OK;
}

unsigned kent_job_threads(unsigned asked)
{
    if (asked > 0) return asked;
    const long processors = sysconf(_SC_NPROCESSORS_ONLN);
    return processors > 0 ? (unsigned)processors : 1;
}

static void copy_notes(const kent_notes *from, kent_notes *to)
{
    for (size_t i = 0; i < from->count; i++) {
        if (from->grave[i]) {
            kent_notes_warn(to, "%s", from->text[i]);
        } else {
            kent_notes_add(to, "%s", from->text[i]);
        }
    }
}

/* Pulls are of places along pipes, which need be no fittings. */
static void copy_cautions_of_pulls(const kent_pulls *p, kent_notes *to)
{
    for (size_t i = 0; i < p->end_count; i++) {
        copy_notes(&p->ends[i].cautions, to);
    }
    for (size_t i = 0; i < p->steep_count; i++) {
        copy_notes(&p->steeps[i].cautions, to);
    }
}

kent_status kent_job_run(const kent_model *m, const kent_job_options *options,
                         kent_results **out, kent_error *err)
{
    kent_results *r = kent_alloc(1, sizeof *r);
    if (!r) return kent_error_nomem(err);
    r->model = m;
    kent_march_plan plan = {.model = m, .results = r, .one_grid = options->one_grid};

    copy_notes(&m->cautions, &r->cautions);
    kent_status status = choose_marches(&plan, options, err);
    if (!status) status = solve_states(m, r, err);
    if (!status) {
        kent_alarms_raise(m, r->steadies, r->steady_count, KENT_ALARM_RUN,
                          &r->cautions);
        status = kent_recorder_new(m, r->steadies, &plan.recorder, err);
    }
    if (!status) status = kent_viewpoints_new(m, plan.recorder, &plan.views, err);
    if (!status) status = name_histories(plan.views, r, err);
    if (!status && r->scenario_count > 0) {
        status = march_all(&plan, kent_job_threads(options->threads), err);
    }
    if (!status) {
        const kent_worst surge = kent_overload_of_marches(r);
        status = kent_recorder_finish(plan.recorder, &surge, &r->loads, err);
    }
    if (!status) status = kent_restraint_size(m, r->loads, &r->restraints, err);
    if (!status) copy_notes(&r->restraints->cautions, &r->cautions);
    if (!status) copy_cautions_of_pulls(&r->restraints->pulls, &r->cautions);
    if (!status) status = kent_limit_table_fill(r, err);
    if (!status) kent_limits_judge(r);
    if (!status) kent_completeness_judge(r);
    if (!status) kent_completeness_test(r);
    if (!status && (r->cautions.failed || m->cautions.failed || m->assumed.failed)) {
        status = kent_error_nomem(err);
    }
    plan_clear(&plan);
    if (status) {
        kent_results_free(r);
        return status;
    }
    *out = r;
    return KENT_OK;
}
