#include "kent_scenario_run.h"

#include "kent_parting.h"

#include <stdlib.h>

enum { BLOCK = 64 }; /* instants pulled at once: small enough to stay in cache */

static kent_peak nothing_seen(void) { return (kent_peak){NAN, NAN, NAN, NAN}; }

static void peak_take(kent_peak *peak, double time, double head)
{
    if (!(head <= peak->highest_head)) { /* NaN: the first */
        peak->highest_head = head;
        peak->highest_at = time;
    }
    if (!(head >= peak->lowest_head)) {
        peak->lowest_head = head;
        peak->lowest_at = time;
    }
}

static kent_swing nothing_told(void) { return (kent_swing){NAN, NAN, NAN, NAN}; }

static void swing_take(kent_swing *e, double time, double value)
{
    if (isnan(value)) return;
    if (!(value <= e->highest)) { /* NaN: the first */
        e->highest = value;
        e->highest_at = time;
    }
    if (!(value >= e->lowest)) {
        e->lowest = value;
        e->lowest_at = time;
    }
}

static void take_devices(double time, const kent_device_row *rows, size_t count,
                         kent_device_extreme *devices)
{
    for (size_t i = 0; i < count; i++) {
        swing_take(&devices[i].flow, time, rows[i].flow);
        for (int j = 0; j < KENT_TOLD; j++) {
            swing_take(&devices[i].told[j], time, rows[i].told[j]);
        }
    }
}

/* heads and flows of one instant: the part of its rows that the views own. */
static void take_peaks(const kent_viewpoints *v, double time, const double *head,
                       kent_peak *points)
{
    for (size_t i = 0; i < v->count; i++) {
        peak_take(&points[v->views[i].point], time, head[i]);
    }
}

static void take_history(const kent_viewpoints *v, kent_history_keeper *keeper,
                         double time, const double *head, const double *flow,
                         const kent_device_row *devices, double *room)
{
    double *heads = room, *flows = room + v->history_count;
    for (size_t i = 0; i < v->history_count; i++) {
        const int at = v->history[i];
        const kent_viewpoint *view = &v->views[at];
        heads[i] = head[at];
        flows[i] =
            view->device < 0 ? view->flow_sign * flow[at] : devices[view->device].flow;
    }
    kent_history_keep(keeper, time, heads, flows, devices);
}

static void take_trace(const kent_scenario_run *run, const kent_trace *trace,
                       kent_history_keeper *keeper, double *room,
                       kent_scenario_result *out)
{
    const kent_viewpoints *v = run->views;
    for (size_t n = 0; n < trace->count; n++) {
        const size_t at = n * trace->watch_count + v->recorder_count;
        const double *head = trace->head + at, *flow = trace->flow + at;
        const kent_device_row *devices = trace->devices + n * trace->device_count;
        take_peaks(v, trace->time[n], head, out->points);
        take_devices(trace->time[n], devices, trace->device_count, out->devices);
        if (keeper) take_history(v, keeper, trace->time[n], head, flow, devices, room);
    }
    if (run->recorder) kent_recorder_take(run->recorder, run->march, trace);
}

static kent_status take_envelopes(const kent_scenario_run *run,
                                  const kent_marcher *march, kent_scenario_result *out,
                                  kent_error *err)
{
    const kent_model *m = run->steady->model;
    out->highest = kent_alloc(m->span_count, sizeof *out->highest);
    out->lowest = kent_alloc(m->span_count, sizeof *out->lowest);
    out->touched = kent_alloc(m->point_count, sizeof *out->touched);
    if (!out->highest || !out->lowest || !out->touched) return kent_error_nomem(err);
    for (size_t i = 0; i < m->span_count; i++) {
        const size_t nodes = (size_t)run->grid->reaches[i] + 1;
        out->highest[i] = kent_alloc(nodes, sizeof *out->highest[i]);
        out->lowest[i] = kent_alloc(nodes, sizeof *out->lowest[i]);
        if (!out->highest[i] || !out->lowest[i]) return kent_error_nomem(err);
        kent_marcher_envelope(march, (int)i, out->highest[i], out->lowest[i]);
    }
    for (size_t i = 0; i < m->device_count; i++) {
        out->devices[i].caution = kent_marcher_caution(march, i);
    }
    out->below_vapour = kent_marcher_below_vapour(march, out->touched);
    return kent_parting_take(m, run->grid, march, out, err);
}

kent_status kent_scenario_run_march(const kent_scenario_run *run,
                                    kent_scenario_result *out, kent_error *err)
{
    const kent_model *m = run->steady->model;
    const kent_viewpoints *v = run->views;
    const kent_march it = m->marches[run->march];
    const double duration = m->scenarios[it.scenario].duration;
    const double step = run->grid->step;
    const size_t instants = (size_t)ceil(duration / step - 1e-9) + 1;
    kent_marcher *march = NULL;
    kent_history_keeper *keeper = NULL;
    double *room = kent_alloc(2 * v->history_count, sizeof *room);
    kent_status status = KENT_OK;

    out->scenario = it.scenario;
    out->state = it.state;
    out->step = step;
    out->steps = instants - 1;
    out->points = kent_alloc(m->point_count, sizeof *out->points);
    out->devices = kent_alloc(m->device_count, sizeof *out->devices);
    if (!room || !out->points || !out->devices) {
        status = kent_error_nomem(err);
        goto done;
    }
    for (size_t i = 0; i < m->device_count; i++) {
        kent_device_extreme *d = &out->devices[i];
        d->flow = nothing_told();
        for (int j = 0; j < KENT_TOLD; j++) {
            d->told[j] = nothing_told();
        }
    }
    for (size_t i = 0; i < m->point_count; i++) {
        out->points[i] = nothing_seen();
    }
    status = kent_marcher_new(m, run->steady, run->grid, it.scenario, v->watches,
                              v->recorder_count + v->count, BLOCK, &march, err);
    if (status) goto done;
    if (run->recorder) {
        kent_recorder_start(run->recorder, run->march, step);
        status =
            kent_history_keeper_new(instants, (size_t)m->solver.history_rows,
                                    v->history_count, m->device_count, &keeper, err);
        if (status) goto done;
    }
    for (size_t left = instants; left > 0 && !status;) {
        kent_trace trace = {0};
        const size_t got =
            kent_marcher_advance(march, left < BLOCK ? left : BLOCK, &trace, err);
        take_trace(run, &trace, keeper, room, out);
        left -= got;
        if (err->status || got == 0) status = err->status ? err->status : KENT_E_SOLVE;
    }
    if (!status && run->recorder) status = take_envelopes(run, march, out, err);
    if (!status && keeper) status = kent_history_finish(keeper, &out->history, err);
done:
    kent_history_keeper_free(keeper);
    kent_marcher_free(march);
    free(room);
    return status;
}

void kent_scenario_result_clear(kent_scenario_result *r, size_t span_count)
{
    for (size_t i = 0; i < span_count; i++) {
        if (r->highest) free(r->highest[i]);
        if (r->lowest) free(r->lowest[i]);
    }
    free(r->highest);
    free(r->lowest);
    free(r->points);
    free(r->devices);
    free(r->touched);
    free(r->cavities);
    free(r->hollow);
    kent_history_clear(&r->history);
    kent_grid_free(r->grid);
    *r = (kent_scenario_result){0};
}
