#include "kent_dae_internal.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* ---- what pipes lose ------------------------------------------------------------- */

/* Slope of the head (m/m) at a flow and its derivative. */
static double slope_of(const kent_reach *r, double flow, double *derivative)
{
    double law = 0.0, by_flow = 0.0;
    if (r->friction) law = kent_friction_slope(r->friction, flow, &by_flow);
    const double square = r->steady + r->minor;
    *derivative = by_flow + 2.0 * square * fabs(flow);
    return law + square * flow * fabs(flow);
}

/* ---- residual -------------------------------------------------------------------- */

/* What leaves the span at a side: the strand that ends there. */
static kent_face out_at(const kent_reach *r, int side, const double *y)
{
    return kent_strand_out(&r->strand[1 - side], y);
}

/* 17.7: what enters a span at a side, with the head H there and what leaves */
static double in_at(const kent_dae *d, size_t span, int side, const double *y)
{
    const double head = y[d->nodes + (size_t)d->model->spans[span].node[side]];
    return 2.0 * head - out_at(&d->reach[span], side, y).value;
}

static void strand_residual(const kent_strand *s, double per_cell, double in,
                            const double *y, double *f)
{
    double near = in;
    for (size_t k = 0; k < s->count; k++) {
        const double far = k + 1 < s->count ? kent_strand_face(s, y, in, k).value
                                            : kent_strand_out(s, y).value;
        f[kent_strand_at(s, k)] += per_cell * (far - near);
        near = far;
    }
}

/* 17.3 */
static void span_residual(const kent_dae *d, size_t span, const double *y, double *f)
{
    const kent_reach *r = &d->reach[span];
    for (int side = 0; side < 2; side++) {
        strand_residual(&r->strand[side], r->per_cell, in_at(d, span, side, y), y, f);
    }
    const size_t first = r->strand[0].first;
    for (size_t k = 0; k < r->strand[0].count; k++) {
        const size_t i = first + 2 * k;
        double by_flow = 0.0;
        const double flow = 0.5 * r->conductance * (y[i] - y[i + 1]);
        const double loss = r->wave_speed * slope_of(r, flow, &by_flow);
        f[i] += loss;
        f[i + 1] -= loss;
    }
}

/* 17.8: what leaves a node into its pipes */
static void node_residual(const kent_dae *d, size_t n, const double *y, double *f)
{
    const kent_model *m = d->model;
    const kent_node *node = &m->nodes[n];
    for (size_t i = 0; i < node->end_count; i++) {
        const kent_end *e = &m->ends[node->end_first + i];
        const kent_reach *r = &d->reach[e->span];
        f[d->nodes + n] +=
            r->conductance * (y[d->nodes + n] - out_at(r, e->side, y).value);
    }
}

void kent_dae_gather(const kent_dae *d, const kent_passage *l, const double *y,
                     double *u)
{
    u[KENT_AT_FLOW] = y[l->at];
    for (int side = 0; side < 2; side++) {
        u[KENT_AT_HEAD + side] =
            l->node[side] < 0 ? 0.0 : y[d->nodes + (size_t)l->node[side]];
    }
    for (size_t k = 0; k < KENT_PASSAGE_STATES; k++) {
        u[KENT_AT_STATE + k] = k < l->ops->states ? y[l->at + 1 + k] : 0.0;
    }
}

static void link_residual(const kent_dae *d, const kent_passage *l, double time,
                          const double *y, double *f)
{
    double u[KENT_PASSAGE_UNKNOWNS];
    kent_law law = {0};
    kent_dae_gather(d, l, y, u);
    l->ops->law(l, time, u, &law);
    f[l->at] = law.f;
    for (size_t k = 0; k < l->ops->states; k++) {
        f[l->at + 1 + k] -= law.rate[k];
    }
    for (int side = 0; side < 2; side++) {
        if (l->node[side] < 0) continue;
        f[d->nodes + (size_t)l->node[side]] += side == 0 ? y[l->at] : -y[l->at];
    }
}

void kent_dae_residual(const kent_dae *d, double time, const double *y,
                       const double *rate, double *f)
{
    memset(f, 0, d->size * sizeof *f);
    memcpy(f, rate, d->nodes * sizeof *f);
    for (size_t i = 0; i < d->links->count; i++) {
        const kent_passage *l = &d->links->link[i];
        for (size_t k = 0; k < l->ops->states; k++) {
            f[l->at + 1 + k] = rate[l->at + 1 + k];
        }
    }
    for (size_t i = 0; i < d->model->span_count; i++) {
        span_residual(d, i, y, f);
    }
    for (size_t n = 0; n < d->model->node_count; n++) {
        node_residual(d, n, y, f);
    }
    for (size_t i = 0; i < d->links->count; i++) {
        link_residual(d, &d->links->link[i], time, y, f);
    }
}

/* ---- derivatives ----------------------------------------------------------------- */

/* Takes derivatives one by one, always in the same order: into the matrix, or, to find
 * out where they are, into a list. */
typedef struct taker {
    size_t count;
    const size_t *slot; /* NULL: the list */
    double *value;
    int64_t *row, *column; /* the list; NULL: only counted */
} taker;

static void take(taker *t, size_t row, size_t column, double value)
{
    if (t->slot) {
        t->value[t->slot[t->count]] += value;
    } else if (t->row) {
        t->row[t->count] = (int64_t)row;
        t->column[t->count] = (int64_t)column;
    }
    t->count++;
}

/* Adds times x what leaves a span at a side to an equation. */
static void take_out(taker *t, size_t row, const kent_reach *r, int side,
                     const double *y, double times)
{
    const kent_strand *s = &r->strand[1 - side];
    const kent_face out = kent_strand_out(s, y);
    for (size_t i = 0; i < 3; i++) {
        take(t, row, kent_strand_at(s, s->count - 3 + i), times * out.by[i]);
    }
}

/* The same of what enters it: 17.7. */
static void take_in(taker *t, size_t row, const kent_dae *d, size_t span, int side,
                    const double *y, double times)
{
    take(t, row, d->nodes + (size_t)d->model->spans[span].node[side], 2.0 * times);
    take_out(t, row, &d->reach[span], side, y, -times);
}

static void strand_derivatives(taker *t, const kent_dae *d, size_t span, int side,
                               const double *y)
{
    const kent_reach *r = &d->reach[span];
    const kent_strand *s = &r->strand[side];
    const double in = in_at(d, span, side, y);
    const double c = r->per_cell;

    take_in(t, kent_strand_at(s, 0), d, span, side, y, -c);
    for (size_t k = 0; k + 1 < s->count; k++) {
        const kent_face face = kent_strand_face(s, y, in, k);
        for (size_t of = 0; of < 2; of++) { /* it ends cell k and begins the next */
            const size_t row = kent_strand_at(s, k + of);
            const double times = of == 0 ? c : -c;
            if (k == 0) {
                take_in(t, row, d, span, side, y, times * face.by[0]);
            } else {
                take(t, row, kent_strand_at(s, k - 1), times * face.by[0]);
            }
            take(t, row, kent_strand_at(s, k), times * face.by[1]);
            take(t, row, kent_strand_at(s, k + 1), times * face.by[2]);
        }
    }
    take_out(t, kent_strand_at(s, s->count - 1), r, 1 - side, y, c);
}

static void span_derivatives(taker *t, const kent_dae *d, size_t span, const double *y)
{
    const kent_reach *r = &d->reach[span];
    strand_derivatives(t, d, span, 0, y);
    strand_derivatives(t, d, span, 1, y);
    for (size_t k = 0; k < r->strand[0].count; k++) {
        const size_t i = r->strand[0].first + 2 * k;
        double by_flow = 0.0;
        const double flow = 0.5 * r->conductance * (y[i] - y[i + 1]);
        (void)slope_of(r, flow, &by_flow);
        const double by = 0.5 * r->conductance * r->wave_speed * by_flow;
        take(t, i, i, by);
        take(t, i, i + 1, -by);
        take(t, i + 1, i, -by);
        take(t, i + 1, i + 1, by);
    }
}

static void node_derivatives(taker *t, const kent_dae *d, size_t n, const double *y)
{
    const kent_model *m = d->model;
    const kent_node *node = &m->nodes[n];
    const size_t row = d->nodes + n;
    for (size_t i = 0; i < node->end_count; i++) {
        const kent_end *e = &m->ends[node->end_first + i];
        const kent_reach *r = &d->reach[e->span];
        take(t, row, row, r->conductance);
        take_out(t, row, r, e->side, y, -r->conductance);
    }
}

static void link_row(taker *t, const kent_dae *d, const kent_passage *l, size_t row,
                     const double *by, double times)
{
    take(t, row, l->at, times * by[KENT_AT_FLOW]);
    for (int side = 0; side < 2; side++) {
        if (l->node[side] < 0) continue;
        take(t, row, d->nodes + (size_t)l->node[side], times * by[KENT_AT_HEAD + side]);
    }
    for (size_t k = 0; k < l->ops->states; k++) {
        take(t, row, l->at + 1 + k, times * by[KENT_AT_STATE + k]);
    }
}

static void link_derivatives(taker *t, const kent_dae *d, const kent_passage *l,
                             double time, const double *y)
{
    double u[KENT_PASSAGE_UNKNOWNS];
    kent_law law = {0};
    kent_dae_gather(d, l, y, u);
    l->ops->law(l, time, u, &law);
    link_row(t, d, l, l->at, law.by, 1.0);
    for (size_t k = 0; k < l->ops->states; k++) {
        link_row(t, d, l, l->at + 1 + k, law.rate_by[k], -1.0);
    }
    for (int side = 0; side < 2; side++) {
        if (l->node[side] < 0) continue;
        take(t, d->nodes + (size_t)l->node[side], l->at, side == 0 ? 1.0 : -1.0);
    }
}

static void take_all(taker *t, const kent_dae *d, double time, const double *y,
                     double c)
{
    for (size_t i = 0; i < d->nodes; i++) {
        take(t, i, i, c);
    }
    for (size_t i = 0; i < d->model->span_count; i++) {
        span_derivatives(t, d, i, y);
    }
    for (size_t n = 0; n < d->model->node_count; n++) {
        node_derivatives(t, d, n, y);
    }
    for (size_t i = 0; i < d->links->count; i++) {
        const kent_passage *l = &d->links->link[i];
        for (size_t k = 0; k < l->ops->states; k++) {
            take(t, l->at + 1 + k, l->at + 1 + k, c);
        }
        link_derivatives(t, d, l, time, y);
    }
}

void kent_dae_derivatives(const kent_dae *d, double time, const double *y, double c,
                          double *value)
{
    taker t = {.slot = d->slot, .value = value};
    memset(value, 0, (size_t)d->row[d->size] * sizeof *value);
    take_all(&t, d, time, y, c);
}

/* ---- where they are -------------------------------------------------------------- */

typedef struct entry {
    int64_t row, column;
    size_t index;
} entry;

static int by_place(const void *a, const void *b)
{
    const entry *x = a, *y = b;
    if (x->row != y->row) return x->row < y->row ? -1 : 1;
    if (x->column != y->column) return x->column < y->column ? -1 : 1;
    return 0;
}

/* Rows and columns of sorted entries, each place once. */
static void number_places(kent_dae *d, const entry *e)
{
    size_t used = 0;
    for (size_t i = 0; i < d->entry_count; i++) {
        const bool again = i > 0 && by_place(&e[i - 1], &e[i]) == 0;
        if (!again) {
            d->column[used++] = e[i].column;
            d->row[e[i].row + 1]++;
        }
        d->slot[e[i].index] = used - 1;
    }
    for (size_t i = 0; i < d->size; i++) {
        d->row[i + 1] += d->row[i];
    }
}

/* y: any values. */
static kent_status find_places(kent_dae *d, const double *y, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    int64_t *row = NULL, *column = NULL;
    entry *e = NULL;
    taker t = {0};

    take_all(&t, d, 0.0, y, 1.0);
    d->entry_count = t.count;
    row = kent_alloc(t.count, sizeof *row);
    column = kent_alloc(t.count, sizeof *column);
    e = kent_alloc(t.count, sizeof *e);
    d->slot = kent_alloc(t.count, sizeof *d->slot);
    d->row = kent_alloc(d->size + 1, sizeof *d->row);
    d->column = kent_alloc(t.count, sizeof *d->column);
    if (!row || !column || !e || !d->slot || !d->row || !d->column) goto done;
    t = (taker){.row = row, .column = column};
    take_all(&t, d, 0.0, y, 1.0);
    for (size_t i = 0; i < t.count; i++) {
        e[i] = (entry){row[i], column[i], i};
    }
    qsort(e, t.count, sizeof *e, by_place);
    number_places(d, e);
    status = KENT_OK;
done:
    free(row);
    free(column);
    free(e);
    return status == KENT_OK ? KENT_OK : kent_error_nomem(err);
}

/* ---- life ------------------------------------------------------------------------ */

static void describe_span(const kent_model *m, const kent_steady *s, size_t i,
                          double stiffness, kent_reach *r)
{
    const kent_span *span = &m->spans[i];
    const double two_ga2 = 2.0 * m->gravity * span->area * span->area;
    r->wave_speed = stiffness * span->wave_speed;
    r->conductance = m->gravity * span->area / r->wave_speed;
    r->per_cell = r->wave_speed * (double)r->strand[0].count / span->length;
    r->minor = span->loss / (two_ga2 * span->length);
    switch (m->solver.friction) {
    case KENT_SURGE_NONE:
        r->minor = 0.0;
        break;
    case KENT_SURGE_CONSTANT: {
        const double flow = s->span_flow[i];
        const double speed = flow == 0.0 ? 1.0 : fabs(flow) / span->area;
        r->steady =
            kent_friction_factor(&span->friction, speed) / (two_ga2 * span->bore);
        break;
    }
    case KENT_SURGE_QUASI_STEADY:
    case KENT_SURGE_UNSTEADY:
        r->friction = &span->friction;
        break;
    }
}

static void lay_out(kent_dae *d, const kent_mesh *mesh)
{
    const kent_model *m = d->model;
    size_t at = 0;
    for (size_t i = 0; i < m->span_count; i++) {
        const double wanted = ceil(m->spans[i].length / mesh->cell - 1e-9);
        const size_t least = KENT_STRAND_CELLS;
        const size_t cells =
            (wanted > (double)least ? (size_t)wanted : least) * (size_t)mesh->parts;
        d->reach[i].strand[0] = (kent_strand){at, 2, cells};
        d->reach[i].strand[1] = (kent_strand){at + 2 * cells - 1, -2, cells};
        at += 2 * cells;
    }
    d->cells = at / 2;
    d->nodes = at;
    at += m->node_count;
    for (size_t i = 0; i < d->links->count; i++) {
        d->links->link[i].at = at;
        at += 1 + d->links->link[i].ops->states;
    }
    d->size = at;
}

kent_status kent_dae_new(const kent_model *m, const kent_steady *s, int scenario,
                         const kent_mesh *mesh, kent_dae **out, kent_error *err)
{
    double *y = NULL;
    kent_dae *d = kent_alloc(1, sizeof *d);
    if (!d) return kent_error_nomem(err);
    d->model = m;
    kent_status status = kent_passages_new(m, s, scenario, &d->links, err);
    if (status) goto done;
    d->reach = kent_alloc(m->span_count, sizeof *d->reach);
    if (!d->reach) {
        status = kent_error_nomem(err);
        goto done;
    }
    lay_out(d, mesh);
    for (size_t i = 0; i < m->span_count; i++) {
        describe_span(m, s, i, mesh->stiffness, &d->reach[i]);
    }
    y = kent_alloc(d->size, sizeof *y);
    status = y ? find_places(d, y, err) : kent_error_nomem(err);
    if (status) goto done;
    *out = d;
    d = NULL;
done:
    free(y);
    kent_dae_free(d);
    return status;
}

void kent_dae_free(kent_dae *d)
{
    if (!d) return;
    kent_passages_free(d->links);
    free(d->reach);
    free(d->slot);
    free(d->row);
    free(d->column);
    free(d);
}

/* ---- values ---------------------------------------------------------------------- */

void kent_dae_start(const kent_dae *d, const kent_steady *s, double *y)
{
    const kent_model *m = d->model;
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_reach *r = &d->reach[i];
        const double rise = s->span_flow[i] / r->conductance;
        for (size_t k = 0; k < r->strand[0].count; k++) {
            const double share = ((double)k + 0.5) / (double)r->strand[0].count;
            const double head = (1.0 - share) * s->node_head[m->spans[i].node[0]] +
                                share * s->node_head[m->spans[i].node[1]];
            y[r->strand[0].first + 2 * k] = head + rise;
            y[r->strand[0].first + 2 * k + 1] = head - rise;
        }
    }
    for (size_t n = 0; n < m->node_count; n++) {
        y[d->nodes + n] = s->node_head[n];
    }
    for (size_t i = 0; i < d->links->count; i++) {
        const kent_passage *l = &d->links->link[i];
        for (size_t k = 0; k <= l->ops->states; k++) {
            y[l->at + k] = l->start[k];
        }
    }
}

void kent_dae_scales(const kent_dae *d, double *scale, double *changing)
{
    const kent_model *m = d->model;
    for (size_t i = 0; i < d->size; i++) {
        scale[i] = 1.0;
        changing[i] = i < d->nodes ? 1.0 : 0.0;
    }
    for (size_t i = 0; i < d->links->count; i++) {
        const kent_passage *l = &d->links->link[i];
        double conductance = 0.0;
        for (int side = 0; side < 2; side++) {
            if (l->node[side] < 0) continue;
            conductance = fmax(conductance, kent_node_conductance(m, l->node[side]));
        }
        scale[l->at] = conductance > 0.0 ? conductance : 1e-3;
        for (size_t k = 0; k < l->ops->states; k++) {
            scale[l->at + 1 + k] = l->scale[1 + k];
            changing[l->at + 1 + k] = 1.0;
        }
    }
}

double kent_dae_head(const kent_dae *d, const double *y, int span, double chainage)
{
    const kent_span *e = &d->model->spans[span];
    const kent_reach *r = &d->reach[span];
    const double start = y[d->nodes + (size_t)e->node[0]];
    const double end = y[d->nodes + (size_t)e->node[1]];
    const double n = (double)r->strand[0].count;
    const double at = fmin(fmax(chainage / e->length, 0.0), 1.0) * n; /* in cells */
    const double low = floor(at - 0.5);
    const double before = low < 0.0 ? 0.0 : low + 0.5;
    const double after = low >= n - 1.0 ? n : low + 1.5;
    const size_t i = r->strand[0].first + 2 * (size_t)fmax(low, 0.0);
    const double from = low < 0.0 ? start : 0.5 * (y[i] + y[i + 1]);
    const size_t j = r->strand[0].first + 2 * (size_t)fmin(low + 1.0, n - 1.0);
    const double to = low >= n - 1.0 ? end : 0.5 * (y[j] + y[j + 1]);
    return from + (to - from) * (at - before) / (after - before);
}
