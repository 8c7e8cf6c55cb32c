#include "kent_equations_internal.h"
#include "kent_duty_internal.h"

#include <assert.h>
#include <math.h>
#include <stdlib.h>

static const double START_SPEED = 1.0; /* m/s */

/* A span without friction at rest has no slope at all, and its flow could not be
 * eliminated. This share of the laminar slope stands in, in the derivative only: the
 * equation solved stays the exact one. */
static const double LEAST_SHARE = 1e-3;

static const double PI = 3.14159265358979323846;

void kent_equations_free(kent_equations *eq)
{
    if (!eq) return;
    free(eq->link);
    free(eq->fixed_level);
    free(eq->entry);
    free(eq->least_slope);
    free(eq->row);
    free(eq->column);
    free(eq->sign);
    free(eq);
}

/* dh/dQ of laminar flow, 128 nu L / (pi g D^4), s/m2. (6.4) */
static double laminar_slope(const kent_span *span)
{
    const kent_friction *f = &span->friction;
    const double bore2 = span->bore * span->bore;
    return 128.0 * f->kinematic_viscosity * span->length /
           (PI * f->gravity * bore2 * bore2);
}

static void fill_links(kent_equations *eq)
{
    const kent_model *m = eq->model;
    for (size_t i = 0; i < m->valve_count; i++) {
        eq->link[i] = kent_link_of_valve(&m->valves[i]);
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        eq->link[eq->first_outflow + i] = kent_link_of_outflow(m, &m->outflows[i]);
    }
    kent_duty_start(eq);
}

/* Loss of the flow out of a fixed level, on the area of its largest span. (6.5) */
static void fill_levels(kent_equations *eq)
{
    const kent_model *m = eq->model;
    for (size_t n = 0; n < eq->nodes; n++) {
        eq->fixed_level[n] = -1;
    }
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        const int n = m->fixed_levels[i].node;
        double area = 0.0; /* m2 */
        if (n < 0) continue;
        eq->fixed_level[n] = (int)i;
        for (size_t e = 0; e < m->nodes[n].end_count; e++) {
            const kent_end *end = &m->ends[m->nodes[n].end_first + e];
            area = fmax(area, m->spans[end->span].area);
        }
        if (area > 0.0) {
            eq->entry[n] =
                (1.0 + m->fixed_levels[i].loss) / (2.0 * m->gravity * area * area);
        }
    }
}

static void fill_spans(kent_equations *eq)
{
    eq->flow_scale = 0.0;
    for (size_t e = 0; e < eq->spans; e++) {
        const kent_span *span = &eq->model->spans[e];
        eq->least_slope[e] = LEAST_SHARE * laminar_slope(span);
        eq->flow_scale = fmax(eq->flow_scale, START_SPEED * span->area);
    }
}

/* One more entry of a node's row. next[n]: where it goes. */
static void node_entry(kent_equations *eq, int64_t *next, int n, size_t column,
                       double sign)
{
    eq->column[next[n]] = (int64_t)column;
    eq->sign[next[n]] = sign;
    next[n]++;
}

static void fill_pattern(kent_equations *eq, int64_t *next)
{
    const size_t first_link = eq->nodes + eq->spans;
    int64_t at = 0;

    for (size_t n = 0; n < eq->nodes; n++) {
        next[n] = eq->row[n];
        node_entry(eq, next, (int)n, n, 0.0);
    }
    for (size_t e = 0; e < eq->spans; e++) {
        const int *node = eq->model->spans[e].node;
        node_entry(eq, next, node[0], eq->nodes + e, -1.0);
        node_entry(eq, next, node[1], eq->nodes + e, 1.0);
        at = eq->row[eq->nodes + e];
        eq->column[at] = node[0];
        eq->column[at + 1] = node[1];
        eq->column[at + 2] = (int64_t)(eq->nodes + e);
    }
    for (size_t i = 0; i < eq->links; i++) {
        const int *node = eq->link[i].node;
        at = eq->row[first_link + i];
        for (int side = 0; side < 2; side++) {
            if (node[side] < 0) continue;
            node_entry(eq, next, node[side], first_link + i, side == 0 ? -1.0 : 1.0);
            eq->column[at++] = node[side];
        }
        eq->column[at] = (int64_t)(first_link + i);
    }
}

/* Sizes of the rows, summed to where they start. */
static void count_rows(kent_equations *eq)
{
    int64_t *length = eq->row + 1;
    for (size_t n = 0; n < eq->nodes; n++) {
        length[n] = 1;
    }
    for (size_t e = 0; e < eq->spans; e++) {
        length[eq->model->spans[e].node[0]]++;
        length[eq->model->spans[e].node[1]]++;
        length[eq->nodes + e] = 3;
    }
    for (size_t i = 0; i < eq->links; i++) {
        int64_t *of_link = &length[eq->nodes + eq->spans + i];
        *of_link = 1;
        for (int side = 0; side < 2; side++) {
            if (eq->link[i].node[side] < 0) continue;
            length[eq->link[i].node[side]]++;
            ++*of_link;
        }
    }
    for (size_t i = 0; i < eq->size; i++) {
        eq->row[i + 1] += eq->row[i];
    }
}

kent_status kent_equations_new(const kent_model *m, kent_equations **out,
                               kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    int64_t *next = NULL;
    kent_equations *eq = kent_alloc(1, sizeof *eq);

    if (!eq) goto done;
    eq->model = m;
    eq->nodes = m->node_count;
    eq->spans = m->span_count;
    eq->first_outflow = m->valve_count;
    eq->first_device = eq->first_outflow + m->outflow_count;
    eq->first_standing = eq->first_device + m->device_count;
    eq->links = eq->first_standing + m->pump_count;
    eq->size = eq->nodes + eq->spans + eq->links;
    eq->link = kent_alloc(eq->links, sizeof *eq->link);
    eq->fixed_level = kent_alloc(eq->nodes, sizeof *eq->fixed_level);
    eq->entry = kent_alloc(eq->nodes, sizeof *eq->entry);
    eq->least_slope = kent_alloc(eq->spans, sizeof *eq->least_slope);
    eq->row = kent_alloc(eq->size + 1, sizeof *eq->row);
    next = kent_alloc(eq->nodes, sizeof *next);
    if (!eq->link || !eq->fixed_level || !eq->entry || !eq->least_slope || !eq->row ||
        !next) {
        goto done;
    }
    fill_links(eq);
    fill_levels(eq);
    fill_spans(eq);
    count_rows(eq);
    eq->column = kent_alloc((size_t)eq->row[eq->size], sizeof *eq->column);
    eq->sign = kent_alloc((size_t)eq->row[eq->size], sizeof *eq->sign);
    if (!eq->column || !eq->sign) goto done;
    fill_pattern(eq, next);
    *out = eq;
    eq = NULL; /* handed over */
    status = KENT_OK;
done:
    free(next);
    kent_equations_free(eq);
    return status == KENT_OK ? KENT_OK : kent_error_nomem(err);
}

void kent_equations_start(const kent_equations *eq, double *x)
{
    const kent_model *m = eq->model;
    double top = -INFINITY; /* m */

    for (size_t i = 0; i < m->fixed_level_count; i++) {
        top = fmax(top, m->fixed_levels[i].level);
    }
    for (size_t n = 0; n < eq->nodes; n++) {
        x[n] = isfinite(top) ? top : 0.0;
    }
    for (size_t e = 0; e < eq->spans; e++) {
        x[eq->nodes + e] = START_SPEED * m->spans[e].area;
    }
    for (size_t i = 0; i < eq->links; i++) {
        x[eq->nodes + eq->spans + i] = kent_link_start(&eq->link[i], eq->flow_scale);
    }
}

/* m3/s, net, into a node from spans and links. */
static double inflow(const kent_equations *eq, const double *x, size_t n)
{
    double sum = 0.0;
    for (int64_t k = eq->row[n] + 1; k < eq->row[n + 1]; k++) {
        sum += eq->sign[k] * x[eq->column[k]];
    }
    return sum;
}

static double node_residual(const kent_equations *eq, const double *x, size_t n)
{
    const double in = inflow(eq, x, n);
    const int level = eq->fixed_level[n];
    if (level < 0) return in; /* (6.1) */
    const double out = fmax(-in, 0.0);
    return x[n] - eq->model->fixed_levels[level].level +
           eq->entry[n] * out * out; /* (6.5) */
}

void kent_equations_residual(const kent_equations *eq, const double *x, double *f)
{
    const double *q = x + eq->nodes;
    const size_t first_link = eq->nodes + eq->spans;
    double slope = 0.0;

    for (size_t n = 0; n < eq->nodes; n++) {
        f[n] = node_residual(eq, x, n);
    }
    for (size_t e = 0; e < eq->spans; e++) { /* (6.2) */
        const kent_span *span = &eq->model->spans[e];
        f[eq->nodes + e] = x[span->node[0]] - x[span->node[1]] -
                           kent_span_loss(eq->model, span, q[e], &slope);
    }
    for (size_t i = 0; i < eq->links; i++) {
        f[first_link + i] = kent_link_residual(&eq->link[i], x, x[first_link + i]);
    }
}

/* heads: x of the nodes. value: the link's row. */
static void link_row(const kent_link *link, const double *heads, double q,
                     double *value)
{
    double by[3]; /* the head before, the head behind, the flow */
    kent_link_derivatives(link, heads, q, by);
    for (int side = 0; side < 2; side++) {
        if (link->node[side] >= 0) *value++ = by[side];
    }
    *value = by[2];
}

void kent_equations_derivatives(const kent_equations *eq, const double *x,
                                double *value)
{
    const size_t first_link = eq->nodes + eq->spans;

    for (size_t n = 0; n < eq->nodes; n++) {
        const bool fixed = eq->fixed_level[n] >= 0;
        double by_inflow = 1.0;
        if (fixed) by_inflow = -2.0 * eq->entry[n] * fmax(-inflow(eq, x, n), 0.0);
        value[eq->row[n]] = fixed ? 1.0 : 0.0;
        for (int64_t k = eq->row[n] + 1; k < eq->row[n + 1]; k++) {
            value[k] = by_inflow * eq->sign[k];
        }
    }
    for (size_t e = 0; e < eq->spans; e++) {
        double *span = value + eq->row[eq->nodes + e];
        double slope = 0.0; /* s/m2 */
        (void)kent_span_loss(eq->model, &eq->model->spans[e], x[eq->nodes + e], &slope);
        span[0] = 1.0;
        span[1] = -1.0;
        span[2] = -fmax(slope, eq->least_slope[e]);
    }
    for (size_t i = 0; i < eq->links; i++) {
        link_row(&eq->link[i], x, x[first_link + i], value + eq->row[first_link + i]);
    }
}

bool kent_equations_is_flow(const kent_equations *eq, size_t i)
{
    const size_t first_link = eq->nodes + eq->spans;
    assert(i < eq->size);
    if (i < eq->nodes) return eq->fixed_level[i] < 0;
    return i >= first_link && kent_link_is_flow(&eq->link[i - first_link]);
}
