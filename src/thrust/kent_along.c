#include "kent_along_internal.h"
#include "kent_press_internal.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;

/* ---- what to watch --------------------------------------------------------------- */

static int along_watch(kent_recorder *r)
{
    kent_along *a = r->along;
    const size_t first = r->watch_count;

    for (size_t i = 0; i < a->run_count; i++) {
        const kent_run *run = &a->runs[i];
        size_t *watch = &a->run_watch[2 * i];
        if (kent_recorder_watch(r, first, run->span, run->start, &watch[0])) return -1;
        if (kent_recorder_watch(r, first, run->span, run->end, &watch[1])) return -1;
    }
    for (size_t i = 0; i < a->strings.end_count; i++) {
        const kent_string_end *e = &a->strings.ends[i];
        if (kent_recorder_watch(r, first, e->span, e->chainage, &a->end_watch[i])) {
            return -1;
        }
    }
    return 0;
}

kent_status kent_along_new(kent_recorder *r, kent_error *err)
{
    const kent_model *m = r->model;
    kent_along *a = kent_alloc(1, sizeof *a);

    if (!a) return kent_error_nomem(err);
    r->along = a;
    if (kent_runs_find(m, &a->runs, &a->run_count, err)) return err->status;
    if (kent_strings_find(m, &a->strings, err)) return err->status;
    const size_t ends = a->strings.end_count;
    a->run_watch = kent_alloc(2 * a->run_count, sizeof *a->run_watch);
    a->end_watch = kent_alloc(ends, sizeof *a->end_watch);
    a->run_seen = kent_alloc(m->march_count, a->run_count * sizeof *a->run_seen);
    a->end_seen = kent_alloc(m->march_count, ends * sizeof *a->end_seen);
    if (!a->run_watch || !a->end_watch || !a->run_seen || !a->end_seen ||
        along_watch(r)) {
        return kent_error_nomem(err);
    }
    return KENT_OK;
}

void kent_along_free(kent_along *a)
{
    if (!a) return;
    kent_runs_free(a->runs, a->run_count);
    kent_strings_clear(&a->strings);
    free(a->run_watch);
    free(a->end_watch);
    free(a->run_seen);
    free(a->end_seen);
    free(a);
}

/* ---- one march ------------------------------------------------------------------- */

static kent_run_seen *runs_seen(const kent_recorder *r, int march)
{
    return r->along->run_seen + (size_t)march * r->along->run_count;
}

static kent_end_seen *ends_seen(const kent_recorder *r, int march)
{
    return r->along->end_seen + (size_t)march * r->along->strings.end_count;
}

void kent_along_start(kent_recorder *r, int march)
{
    for (size_t i = 0; i < r->along->run_count; i++) {
        kent_run_seen *seen = &runs_seen(r, march)[i];
        *seen = (kent_run_seen){.lowest = {NAN, INFINITY}, .highest = {NAN, -INFINITY}};
        for (size_t k = 0; k < KENT_RUN_ROWS; k++) {
            seen->row[k].time = NAN;
        }
    }
    for (size_t i = 0; i < r->along->strings.end_count; i++) {
        ends_seen(r, march)[i] = (kent_end_seen){-INFINITY, NAN};
    }
}

static double run_momentum_factor(const kent_model *m, const kent_run *run, double flow)
{
    kent_port port = kent_port_blank();

    port.span = run->span;
    port.inside_diameter = sqrt(4.0 * run->area / PI);
    return kent_port_momentum_factor(m, &port, flow);
}

static kent_run_state run_state(const kent_model *m, const kent_run *run,
                                const size_t watch[2], const kent_trace *trace,
                                size_t n)
{
    const kent_span *span = &m->spans[run->span];
    kent_run_state at = {{0.0, 0.0}, {0.0, 0.0}, {0.0, 0.0}, {0.0, 0.0}};

    for (size_t k = 0; k < 2; k++) {
        at.head[k] = trace->head[n * trace->watch_count + watch[k]];
        at.flow[k] = trace->flow[n * trace->watch_count + watch[k]];
        at.momentum_factor[k] = run_momentum_factor(m, run, at.flow[k]);
        at.loss[k] = kent_span_loss(m, span, at.flow[k], NULL) *
                     (run->end - run->start) / span->length;
    }
    return at;
}

static void run_keep(kent_run_seen *seen, double duration, kent_run_moment now)
{
    const double share = duration > 0.0 ? now.time / duration : 0.0;
    const double at = fmin(fmax(share, 0.0) * KENT_RUN_ROWS, KENT_RUN_ROWS - 1.0);
    kent_run_moment *row = &seen->row[(size_t)at];

    if (now.force < seen->lowest.force) seen->lowest = now;
    if (now.force > seen->highest.force) seen->highest = now;
    if (isnan(row->time) || fabs(now.force) > fabs(row->force)) *row = now;
}

void kent_along_take(kent_recorder *r, int march, const kent_trace *trace)
{
    const kent_along *a = r->along;
    const kent_march it = r->model->marches[march];
    const kent_model *m = r->steadies[it.state]->model;
    const double duration = m->scenarios[it.scenario].duration;

    for (size_t i = 0; i < a->run_count; i++) {
        const kent_run *run = &a->runs[i];
        for (size_t n = 0; n < trace->count; n++) {
            const kent_run_state at = run_state(m, run, &a->run_watch[2 * i], trace, n);
            run_keep(&runs_seen(r, march)[i], duration,
                     (kent_run_moment){
                         trace->time[n],
                         kent_run_force(run->area, m->water.density, m->gravity, &at)});
        }
    }
    for (size_t i = 0; i < a->strings.end_count; i++) {
        kent_end_seen *seen = &ends_seen(r, march)[i];
        for (size_t n = 0; n < trace->count; n++) {
            const double head = trace->head[n * trace->watch_count + a->end_watch[i]];
            if (head > seen->highest) *seen = (kent_end_seen){head, trace->time[n]};
        }
    }
}

/* ---- results of runs ------------------------------------------------------------- */

static int run_finish(const kent_recorder *r, size_t index, kent_run *run)
{
    const size_t count = r->model->march_count;

    run->marches = kent_alloc(count, sizeof *run->marches);
    if (!run->marches) return -1;
    run->march_count = count;
    for (size_t k = 0; k < count; k++) {
        const kent_run_seen *seen = &runs_seen(r, (int)k)[index];
        kent_run_march *march = &run->marches[k];
        if (!r->slots[k].started || isnan(seen->highest.time)) continue;
        march->history = kent_alloc(KENT_RUN_ROWS, sizeof *march->history);
        if (!march->history) return -1;
        march->set = true;
        march->lowest = seen->lowest;
        march->highest = seen->highest;
        for (size_t row = 0; row < KENT_RUN_ROWS; row++) {
            if (isnan(seen->row[row].time)) continue;
            march->history[march->history_count++] = seen->row[row];
        }
    }
    return 0;
}

/* ---- results of strings ---------------------------------------------------------- */

/* A place on a pipe as the pressures of still water ask for it. */
typedef struct end_place {
    const kent_recorder *r;
    const kent_string_end *end;
    kent_fitting at; /* its level alone */
} end_place;

static void end_add(const end_place *p, const char *name, kent_case_kind kind,
                    kent_march march, double pressure, double time, kent_string_end *e)
{
    const kent_model *m = p->r->model;
    kent_string_case *c = &e->cases[e->case_count];

    if (isnan(pressure)) return; /* there is no such case */
    *c = (kent_string_case){
        .kind = kind,
        .scenario = march.scenario,
        .state = march.state,
        .time = time,
        .pressure = fmax(pressure, 0.0),
        .safety_factor = kent_press_factor(m, kind),
        .lasts = kind != KENT_CASE_TEST && march.scenario < 0,
    };
    (void)snprintf(c->name, sizeof c->name, "%s", name);
    c->title = kent_name_in_state(m, c->name, c->state);
    e->case_count++;
}

static void end_add_marches(const end_place *p, size_t index, kent_string_end *e)
{
    const kent_model *m = p->r->model;

    for (size_t k = 0; k < m->march_count; k++) {
        const kent_end_seen *seen = &ends_seen(p->r, (int)k)[index];
        const kent_scenario *scenario = &m->scenarios[m->marches[k].scenario];
        if (!kent_recorder_counts(p->r, k) || isnan(seen->at)) continue;
        end_add(p, scenario->id, kent_press_kind_of(scenario), m->marches[k],
                kent_model_pressure(m, seen->highest, p->at.at.z), seen->at, e);
    }
}

static int end_finish(const kent_recorder *r, const kent_site_test *test, size_t index,
                      kent_string_end *e)
{
    const kent_march none = {-1, -1};
    const kent_model *m = r->model;
    const kent_span *span = &m->spans[e->span];
    end_place p = {.r = r, .end = e};
    const double z = kent_span_level(m, span, e->chainage);

    p.at.at = (kent_vec3){NAN, NAN, z};
    e->cases = kent_alloc(4 + m->state_count + m->march_count, sizeof *e->cases);
    if (!e->cases) return -1;
    end_add(&p, "test", KENT_CASE_TEST, none, kent_press_of_test(m, test, &p.at), NAN,
            e);
    end_add(&p, "static", KENT_CASE_STATIC, none,
            kent_model_pressure(m, kent_static_level(m, span->node[0]), z), NAN, e);
    end_add(&p, "shut-off", KENT_CASE_SHUT_OFF, none,
            kent_model_pressure(m, kent_shut_off_level(m, e->span), z), NAN, e);
    for (size_t s = 0; s < m->state_count; s++) {
        const double head = kent_steady_head(m, r->steadies[s], e->span, e->chainage);
        end_add(&p, "steady", KENT_CASE_STEADY, (kent_march){-1, (int)s},
                kent_model_pressure(m, head, z), NAN, e);
    }
    end_add(&p, "future", KENT_CASE_STATIC, none, kent_press_later(m, &p.at), NAN, e);
    end_add_marches(&p, index, e);
    return 0;
}

kent_status kent_along_finish(const kent_recorder *r, kent_loads_result *loads,
                              kent_error *err)
{
    if (kent_runs_find(r->model, &loads->runs, &loads->run_count, err)) {
        return err->status;
    }
    if (kent_strings_find(r->model, &loads->strings, err)) return err->status;
    for (size_t i = 0; i < loads->run_count; i++) {
        if (run_finish(r, i, &loads->runs[i])) return kent_error_nomem(err);
    }
    for (size_t i = 0; i < loads->strings.end_count; i++) {
        if (end_finish(r, &loads->test, i, &loads->strings.ends[i])) {
            return kent_error_nomem(err);
        }
    }
    return KENT_OK;
}
