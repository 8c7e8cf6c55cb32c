#include "kent_marcher.h"

#include "kent_cavities_internal.h"
#include "kent_drag_internal.h"
#include "kent_recall_internal.h"
#include "kent_stands_internal.h"

#include <math.h>
#include <stdlib.h>

enum { BLOCK_MOST = 1024 };
/* m: two places closer than this are one. */
static const double SAME_PLACE = 1e-6;
/* m: a cavity's head is the limit itself, but for rounding. */
static const double SAME_HEAD = 1e-6;

typedef struct kent_eye { /* a watch, made ready */
    size_t node;
    double share;        /* of the next node, 0 .. 1; 0: at a grid point */
    double flow_per_gap; /* 1/(2B), m2/s */
} kent_eye;

struct kent_marcher {
    const kent_model *model;
    const kent_kernel *kernel;
    kent_waves *waves;
    kent_drag *drag;
    kent_recall *recall; /* NULL: nothing remembers */
    kent_ends *ends;
    kent_cavities *cavities; /* NULL: the water never parts */
    kent_schedule *schedule;
    double step;    /* s */
    size_t instant; /* steps from t = 0 to what the waves hold */
    bool started;   /* t = 0 was returned */
    kent_error stopped;
    kent_eye *eyes;
    size_t eye_count, block;
    double *time, *head, *flow; /* of the trace */
    kent_device_row *devices;
};

/* ---- building -------------------------------------------------------------------- */

static kent_status look(const kent_model *m, const kent_waves *w,
                        const kent_watch *watch, kent_eye *eye, kent_error *err)
{
    const size_t span = (size_t)watch->span;
    if (watch->span < 0 || span >= m->span_count ||
        !(watch->chainage >= -SAME_PLACE &&
          watch->chainage <= m->spans[span].length + SAME_PLACE)) {
        return kent_error_set(err, KENT_E_INPUT, "",
                              "nothing to watch at %g m of span %d", watch->chainage,
                              watch->span);
    }
    const double reaches = (double)w->reaches[span];
    const double reach = m->spans[span].length / reaches; /* m */
    double below = floor(watch->chainage / reach);
    double share = watch->chainage / reach - below;
    if ((1.0 - share) * reach < SAME_PLACE) {
        below += 1.0;
        share = 0.0;
    }
    if (share * reach < SAME_PLACE) share = 0.0;
    if (below < 0.0 || below >= reaches) {
        below = below < 0.0 ? 0.0 : reaches;
        share = 0.0;
    }
    *eye = (kent_eye){w->first[span] + (size_t)below, share,
                      1.0 / (2.0 * w->impedance[span])};
    return KENT_OK;
}

static kent_status make_trace(kent_marcher *k, const kent_watch *watches,
                              size_t watch_count, size_t block, kent_error *err)
{
    k->block = block;
    k->eye_count = watch_count;
    k->eyes = kent_alloc(watch_count, sizeof *k->eyes);
    k->time = kent_alloc(block, sizeof *k->time);
    k->head = kent_alloc(block, (watch_count + 1) * sizeof *k->head);
    k->flow = kent_alloc(block, (watch_count + 1) * sizeof *k->flow);
    k->devices = kent_alloc(block, (k->model->device_count + 1) * sizeof *k->devices);
    if (!k->eyes || !k->time || !k->head || !k->flow || !k->devices) {
        return kent_error_nomem(err);
    }
    for (size_t i = 0; i < watch_count; i++) {
        const kent_status status =
            look(k->model, k->waves, &watches[i], &k->eyes[i], err);
        if (status != KENT_OK) return status;
    }
    return KENT_OK;
}

static void start_waves(kent_marcher *k, const kent_steady *s)
{
    for (size_t i = 0; i < k->model->span_count; i++) {
        const kent_span *span = &k->model->spans[i];
        const double head[2] = {s->node_head[span->node[0]],
                                s->node_head[span->node[1]]};
        kent_waves_set(k->waves, i, head, s->span_flow[i]);
    }
    kent_drag_start(k->drag, k->model, s, k->waves);
    kent_recall_start(k->recall, k->waves);
}

/* NOLINTNEXTLINE(readability-function-size): five things to know, four to say how */
kent_status kent_marcher_new(const kent_model *m, const kent_steady *s,
                             const kent_grid *grid, int scenario,
                             const kent_watch *watches, size_t watch_count,
                             size_t block, kent_marcher **out, kent_error *err)
{
    const bool parts = m->solver.column_separation != KENT_SEPARATION_NONE;
    kent_status status = KENT_E_INPUT;
    kent_marcher *k = kent_alloc(1, sizeof *k);

    if (!k) return kent_error_nomem(err);
    if (block < 1 || block > BLOCK_MOST) {
        (void)kent_error_set(err, status, "", "a block of %zu instants; 1 .. %d", block,
                             BLOCK_MOST);
        goto done;
    }
    if (grid->node_total > UINT32_MAX) {
        /* unreached: takes more memory than any test may have */
        (void)kent_error_set(err, status, "", "%zu grid points are too many",
                             grid->node_total);
        goto done;
    }
    k->model = m;
    k->step = grid->step;
    status = kent_kernel_pick(getenv("KENTLEDGE_SIMD"), &k->kernel, err);
    if (status == KENT_OK) status = kent_drag_new(m, s, grid, &k->drag, err);
    if (status == KENT_OK) {
        status = kent_waves_new(m, grid, k->drag->implicit, &k->waves, err);
    }
    if (status == KENT_OK) {
        status = kent_recall_new(m, s, grid, k->waves, &k->recall, err);
    }
    if (status == KENT_OK) {
        status = kent_ends_new(m, s, k->waves, scenario, &k->ends, err);
    }
    if (status == KENT_OK) status = kent_schedule_new(m, scenario, &k->schedule, err);
    if (status == KENT_OK) status = make_trace(k, watches, watch_count, block, err);
    if (status != KENT_OK) goto done;
    start_waves(k, s);
    if (parts) {
        status = kent_cavities_new(m, k->step, KENT_CAVITY_HEIGHTS, k->waves, k->ends,
                                   &k->cavities, err);
        if (status != KENT_OK) goto done;
    }
    *out = k;
    k = NULL;
done:
    kent_marcher_free(k);
    return status;
}

void kent_marcher_free(kent_marcher *k)
{
    if (!k) return;
    kent_waves_free(k->waves);
    kent_drag_free(k->drag);
    kent_recall_free(k->recall);
    kent_ends_free(k->ends);
    kent_cavities_free(k->cavities);
    kent_schedule_free(k->schedule);
    free(k->eyes);
    free(k->time);
    free(k->head);
    free(k->flow);
    free(k->devices);
    free(k);
}

/* ---- marching -------------------------------------------------------------------- */

static double now(const kent_marcher *k)
{
    return (double)k->instant * k->step; /* s, counted */
}

/* Says where a node was left behind by the sweep, and what would help. */
static void stop(kent_marcher *k)
{
    const kent_waves *w = k->waves;
    size_t worst_span = 0, worst_node = 0;
    double worst = 0.0; /* k|d| = R|Q|/(2B) */
    for (size_t span = 0; span < w->span_count; span++) {
        for (size_t j = 0; j <= w->reaches[span]; j++) {
            const size_t node = w->first[span] + j;
            const double kd = w->k[node] * fabs(w->p[node] - w->m[node]);
            if (kd <= worst) continue; /* NaN is worse than any number */
            worst = kd;
            worst_span = span;
            worst_node = j;
            if (isnan(kd)) goto found;
        }
    }
found:;
    const kent_span *span = &k->model->spans[worst_span];
    const double reaches = (double)w->reaches[worst_span];
    const double chainage = span->length * (double)worst_node / reaches;
    if (!isfinite(worst)) {
        (void)kent_error_set(&k->stopped, KENT_E_SOLVE, "",
                             "span %s at %.1f m: no finite head after %.4g s", span->id,
                             chainage, now(k));
        return;
    }
    (void)kent_error_set(
        &k->stopped, KENT_E_SOLVE, "",
        "span %s at %.1f m: at %.4g s friction takes %.2g of the wave in one reach "
        "(R|Q|/B; stable to %.2g); it needs at least %.0f reaches: raise min_reaches "
        "or "
        "shorten time_step",
        span->id, chainage, now(k), 2.0 * worst, 2.0 * KENT_EXPLICIT_LIMIT,
        ceil(reaches * worst / KENT_EXPLICIT_LIMIT));
}

/* Walls take water in after the sweep: by the heads of cavities, where there are any,
 * and unseen by it. */
static void yield(kent_marcher *k)
{
    if (!k->recall || k->recall->wall_count == 0) return;
    if (k->cavities) kent_cavities_show(k->cavities, k->waves);
    kent_recall_yield(k->recall, k->kernel, k->waves);
    if (k->cavities) kent_cavities_hide(k->cavities, k->waves);
}

/* From one instant to the next. */
static bool advance_once(kent_marcher *k)
{
    kent_recall_pull(k->recall, k->kernel, k->waves);
    kent_drag_refresh(k->drag, k->waves);
    int64_t beyond =
        k->cavities ? kent_cavities_sweep(k->cavities, k->drag, k->waves) : 0;
    beyond += kent_waves_sweep(k->waves, k->kernel);
    if (beyond != 0) {
        stop(k); /* which finds the culprits where they are */
        return false;
    }
    yield(k);
    kent_waves_move(k->waves);
    k->instant++;
    kent_ends_move(k->ends, k->schedule, now(k), k->step);
    kent_ends_solve(k->ends, k->waves);
    if (k->cavities) kent_cavities_solve(k->cavities, k->waves, now(k));
    k->stopped = k->ends->stands->stopped;
    return k->stopped.status == KENT_OK;
}

static double head_at(const kent_marcher *k, size_t node)
{
    return k->cavities ? kent_cavities_head(k->cavities, k->waves, node)
                       : kent_waves_head(k->waves, node);
}

/* 2 B Q at a node: before it (-1), after it (+1), or the mean of both (0). */
static double gap_at(const kent_marcher *k, size_t node, int side)
{
    const double p = k->waves->p[node], m = k->waves->m[node];
    if (side == 0) return p - m;
    return side < 0 ? 2.0 * (p - head_at(k, node)) : 2.0 * (head_at(k, node) - m);
}

/* The same as record() does, where some block is awake. */
static void record_awake(const kent_marcher *k, double *head, double *flow)
{
    for (size_t i = 0; i < k->eye_count; i++) {
        const kent_eye *eye = &k->eyes[i];
        double gap = gap_at(k, eye->node, eye->share > 0.0 ? 1 : 0);
        head[i] = head_at(k, eye->node);
        if (eye->share > 0.0) {
            head[i] += eye->share * (head_at(k, eye->node + 1) - head[i]);
            gap += eye->share * (gap_at(k, eye->node + 1, -1) - gap);
        }
        flow[i] = gap * eye->flow_per_gap;
    }
}

static void record(kent_marcher *k, size_t row)
{
    const double *p = k->waves->p, *m = k->waves->m;
    double *head = k->head + row * k->eye_count, *flow = k->flow + row * k->eye_count;
    k->time[row] = now(k);
    kent_stands_tell(k->ends->stands, k->devices + row * k->model->device_count);
    if (k->cavities && k->cavities->awake_blocks > 0) {
        record_awake(k, head, flow);
        return;
    }
    for (size_t i = 0; i < k->eye_count; i++) {
        const kent_eye *eye = &k->eyes[i];
        double sum = p[eye->node] + m[eye->node];
        double gap = p[eye->node] - m[eye->node];
        if (eye->share > 0.0) {
            const size_t next = eye->node + 1;
            sum += eye->share * (p[next] + m[next] - sum);
            gap += eye->share * (p[next] - m[next] - gap);
        }
        head[i] = 0.5 * sum;
        flow[i] = gap * eye->flow_per_gap;
    }
}

size_t kent_marcher_advance(kent_marcher *k, size_t count, kent_trace *trace,
                            kent_error *err)
{
    size_t row = 0;
    if (count > k->block) count = k->block;
    while (row < count && k->stopped.status == KENT_OK) {
        if (k->started && !advance_once(k)) break;
        k->started = true;
        record(k, row++);
    }
    *trace =
        (kent_trace){row,     k->eye_count, k->model->device_count, k->time, k->head,
                     k->flow, k->devices};
    if (row < count) {
        (void)kent_error_set(err, k->stopped.status, k->stopped.where, "%s",
                             k->stopped.what);
    }
    return row;
}

/* ---- what became of it ----------------------------------------------------------- */

static double lowest_head(const kent_marcher *k, size_t node)
{
    return fmin(0.5 * k->waves->twice_lowest[node], head_at(k, node));
}

void kent_marcher_envelope(const kent_marcher *k, int span, double *highest,
                           double *lowest)
{
    const kent_waves *w = k->waves;
    for (size_t i = 0; i <= w->reaches[span]; i++) {
        const size_t node = w->first[span] + i; /* the present was not swept yet */
        highest[i] = fmax(0.5 * w->twice_highest[node], head_at(k, node));
        lowest[i] = lowest_head(k, node);
    }
}

void kent_marcher_profile(const kent_marcher *k, int span, double *head, double *flow)
{
    const kent_waves *w = k->waves;
    for (size_t i = 0; i <= w->reaches[span]; i++) {
        const size_t node = w->first[span] + i;
        head[i] = head_at(k, node);
        flow[i] = kent_waves_flow(w, (size_t)span, node);
    }
}

const char *kent_marcher_caution(const kent_marcher *k, size_t device)
{
    return kent_stands_caution(k->ends->stands, device);
}

void kent_marcher_hollow(const kent_marcher *k, int span, double *volume)
{
    const size_t reaches = k->waves->reaches[span], first = k->waves->first[span];
    for (size_t i = 0; i <= reaches; i++) {
        volume[i] =
            k->cavities ? kent_cavities_volume(k->cavities, k->waves, first + i) : 0.0;
    }
    if (!k->cavities) return;
    for (int side = 0; side < 2; side++) {
        const int node = k->model->spans[span].node[side];
        volume[side == 0 ? 0 : reaches] = kent_cavities_at_node(k->cavities, node);
    }
}

size_t kent_marcher_cavities(const kent_marcher *k, kent_cavity *out, size_t most)
{
    return k->cavities ? kent_cavities_list(k->cavities, out, most) : 0;
}

/* The points of a span's route on either side of a chainage (m), or the one at it. */
static void touch(const kent_model *m, const kent_span *span, double chainage,
                  bool *touched)
{
    const double start = m->chainage[span->route_first];
    for (size_t i = 0; i < span->route_count; i++) {
        const size_t at = span->route_first + i;
        const double gap = m->chainage[at] - start - chainage; /* m ahead */
        if (gap < -SAME_PLACE) continue;
        touched[m->route[at]] = true;
        if (gap > SAME_PLACE && i > 0) touched[m->route[at - 1]] = true;
        return;
    }
}

size_t kent_marcher_below_vapour(const kent_marcher *k, bool *touched)
{
    const kent_model *m = k->model;
    const kent_waves *w = k->waves;
    size_t count = 0;
    for (size_t s = 0; s < m->span_count; s++) {
        const kent_span *span = &m->spans[s];
        for (size_t i = 0; i <= w->reaches[s]; i++) {
            const double chainage = span->length * (double)i / (double)w->reaches[s];
            const double limit =
                kent_vapour_head(&m->water, kent_span_level(m, span, chainage),
                                 m->barometric, m->gravity);
            if (lowest_head(k, w->first[s] + i) >= limit - SAME_HEAD) continue;
            count++;
            touch(m, span, chainage, touched);
        }
    }
    return count;
}

const char *kent_marcher_kernel(const kent_marcher *k) { return k->kernel->name; }
