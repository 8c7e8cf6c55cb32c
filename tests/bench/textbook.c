#include "textbook.h"

#include <math.h>
#include <stdlib.h>

typedef struct node {
    double head, flow; /* m, m3/s */
    double next_head, next_flow;
    double highest, lowest; /* m */
} node;

typedef struct line { /* one span */
    node *nodes;      /* [reaches + 1] */
    size_t reaches;
    double b;    /* s/m2 */
    double r;    /* s2/m5, of one reach */
    double c[2]; /* m, the characteristics that reach its start and end */
} line;

struct textbook {
    const kent_model *model;
    const kent_steady *steady;
    const kent_grid *grid;
    bool follow;
    size_t step;
    line *lines;              /* [span_count] */
    const kent_event **moves; /* [valve_count] the ramp of each valve, or NULL */
};

/* m3/s whose friction factor a span keeps: the steady one's, or of 1 m/s at rest. */
static double lasting_flow(const kent_model *m, const kent_steady *s, size_t span)
{
    double derivative = 0.0;
    const double q = s->span_flow[span];
    const double loss = kent_span_loss(m, &m->spans[span], q, &derivative);
    return fabs(loss) < 1e-10 ? m->spans[span].area : q;
}

static double reach_resistance(const textbook *t, size_t span, double flow)
{
    const kent_span *s = &t->model->spans[span];
    const double f = kent_friction_factor(&s->friction, fabs(flow) / s->area);
    return (f * s->length / s->bore + s->loss) /
           (2.0 * t->model->gravity * s->area * s->area * t->grid->reaches[span]);
}

textbook *textbook_new(const kent_model *m, const kent_steady *s, const kent_grid *grid,
                       int scenario, bool follow)
{
    textbook *t = calloc(1, sizeof *t);
    if (!t) return NULL;
    *t = (textbook){m, s, grid, follow, 0, NULL, NULL};
    t->lines = calloc(m->span_count, sizeof *t->lines);
    t->moves =
        calloc(m->valve_count + 1, sizeof(const kent_event *)) /* NOLINT: pointers */;
    if (!t->lines || !t->moves) goto fail;
    for (size_t i = 0; scenario >= 0 && i < m->scenarios[scenario].event_count; i++) {
        const kent_event *e = &m->events[m->scenarios[scenario].event_first + i];
        if (e->kind == KENT_EVENT_VALVE) t->moves[e->target] = e;
    }
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        line *l = &t->lines[i];
        l->reaches = (size_t)grid->reaches[i];
        l->b = grid->wave_speed_used[i] / (m->gravity * span->area);
        l->r = reach_resistance(t, i, lasting_flow(m, s, i));
        l->nodes = calloc(l->reaches + 1, sizeof *l->nodes);
        if (!l->nodes) goto fail;
        const double start = s->node_head[span->node[0]];
        const double end = s->node_head[span->node[1]];
        for (size_t j = 0; j <= l->reaches; j++) {
            node *n = &l->nodes[j];
            n->head = start + (end - start) * (double)j / (double)l->reaches;
            n->flow = s->span_flow[i];
            n->highest = n->lowest = n->head;
        }
    }
    return t;
fail:
    textbook_free(t);
    return NULL;
}

void textbook_free(textbook *t)
{
    if (!t) return;
    for (size_t i = 0; t->lines && i < t->model->span_count; i++) {
        free(t->lines[i].nodes);
    }
    free(t->lines);
    free(t->moves);
    free(t);
}

/* The characteristic that reaches the start (side 0) or end (side 1) of a line. */
static double arriving(const textbook *t, const line *l, int side)
{
    const node *foot = side == 0 ? &l->nodes[1] : &l->nodes[l->reaches - 1];
    const double r =
        t->follow ? reach_resistance(t, (size_t)(l - t->lines), foot->flow) : l->r;
    const double q = side == 0 ? -foot->flow : foot->flow;
    return foot->head + l->b * q - r * q * fabs(q);
}

/* Sum of 1/B and of C/B over the ends that meet at a node. */
static void gather(const textbook *t, const kent_node *at, double *sum_b, double *sum_c)
{
    *sum_b = *sum_c = 0.0;
    for (size_t i = 0; i < at->end_count; i++) {
        const kent_end *end = &t->model->ends[at->end_first + i];
        line *l = &t->lines[end->span];
        l->c[end->side] = arriving(t, l, end->side);
        *sum_b += 1.0 / l->b;
        *sum_c += l->c[end->side] / l->b;
    }
}

static void set_ends(textbook *t, const kent_node *at, double head)
{
    for (size_t i = 0; i < at->end_count; i++) {
        const kent_end *end = &t->model->ends[at->end_first + i];
        line *l = &t->lines[end->span];
        const double into = (l->c[end->side] - head) / l->b;
        node *n = end->side == 0 ? &l->nodes[0] : &l->nodes[l->reaches];
        n->next_head = head;
        n->next_flow = end->side == 0 ? -into : into;
    }
}

static double capacity_now(const textbook *t, int valve)
{
    const kent_model *m = t->model;
    const kent_valve *v = &m->valves[valve];
    const double time = (double)t->step * t->grid->step;
    const kent_event *move = t->moves[valve];
    double opening = v->opening;
    if (move) {
        const double share = (time - move->start_time) / move->ramp_time;
        if (share >= 1.0) {
            opening = move->to;
        } else if (share > 0.0) {
            opening += (move->to - opening) * share;
        }
    }
    return t->steady->valve_capacity[valve] *
           kent_valve_relative_capacity(&v->curve, opening);
}

/* Positive root of a Q^2 + b Q = c (a, b, c >= 0), without cancellation. */
static double positive_root(double a, double b, double c)
{
    return c > 0.0 ? 2.0 * c / (b + sqrt(b * b + 4.0 * a * c)) : 0.0;
}

static double valve_flow(double capacity, double drop, double impedance)
{
    if (capacity <= 0.0) return 0.0;
    const double q = positive_root(1.0 / (capacity * capacity), impedance, fabs(drop));
    return drop < 0.0 ? -q : q;
}

static void solve_valve(textbook *t, const kent_node *at, int valve)
{
    const kent_valve *v = &t->model->valves[valve];
    double b0 = 0.0, c0 = 0.0, b1 = 0.0, c1 = 0.0;
    if (at != &t->model->nodes[v->node[0]]) return; /* solved from its first side */
    gather(t, at, &b0, &c0);
    if (v->node[1] < 0) {
        const double q =
            valve_flow(capacity_now(t, valve), c0 / b0 - v->discharge_level, 1.0 / b0);
        set_ends(t, at, (c0 - q) / b0);
        return;
    }
    const kent_node *beyond = &t->model->nodes[v->node[1]];
    gather(t, beyond, &b1, &c1);
    const double q =
        valve_flow(capacity_now(t, valve), c0 / b0 - c1 / b1, 1.0 / b0 + 1.0 / b1);
    set_ends(t, at, (c0 - q) / b0);
    set_ends(t, beyond, (c1 + q) / b1);
}

static void solve_level(textbook *t, const kent_node *at)
{
    const kent_model *m = t->model;
    const kent_fixed_level *f = &m->fixed_levels[at->device];
    double b = 0.0, c = 0.0, area = 0.0, head = f->level;
    gather(t, at, &b, &c);
    for (size_t i = 0; i < at->end_count; i++) {
        area = fmax(area, m->spans[m->ends[at->end_first + i].span].area);
    }
    if (head > c / b) { /* flows out: k Q^2 + Q/b - (level - c/b) = 0 */
        const double k = (1.0 + f->loss) / (2.0 * m->gravity * area * area);
        const double q = positive_root(k, 1.0 / b, head - c / b);
        head -= k * q * q;
    }
    set_ends(t, at, head);
}

static void solve_node(textbook *t, const kent_node *at)
{
    double b = 0.0, c = 0.0;
    switch (at->kind) {
    case KENT_NODE_FIXED_LEVEL:
        solve_level(t, at);
        return;
    case KENT_NODE_VALVE:
        solve_valve(t, at, at->device);
        return;
    case KENT_NODE_OUTFLOW: /* as long as the pressure lasts */
        gather(t, at, &b, &c);
        set_ends(t, at, (c - t->model->outflows[at->device].flow) / b);
        return;
    case KENT_NODE_JUNCTION:
        gather(t, at, &b, &c);
        set_ends(t, at, c / b);
        return;
    }
}

/* noinline: one call per node is what this program stands for. */
static __attribute__((noinline)) void solve_interior(node *n, double b, double r_left,
                                                     double r_right)
{
    const double ql = n[-1].flow, qr = n[1].flow;
    const double cp = n[-1].head + b * ql - r_left * ql * fabs(ql);
    const double cm = n[1].head - b * qr + r_right * qr * fabs(qr);
    n->next_head = 0.5 * (cp + cm);
    n->next_flow = (cp - cm) / (2.0 * b);
}

static void take_over(line *l)
{
    for (size_t j = 0; j <= l->reaches; j++) {
        node *n = &l->nodes[j];
        n->head = n->next_head;
        n->flow = n->next_flow;
        if (n->head > n->highest) n->highest = n->head;
        if (n->head < n->lowest) n->lowest = n->head;
    }
}

static void run_line(const textbook *t, size_t span)
{
    const line *l = &t->lines[span];
    for (size_t j = 1; j < l->reaches; j++) {
        double left = l->r, right = l->r;
        if (t->follow) {
            left = reach_resistance(t, span, l->nodes[j - 1].flow);
            right = reach_resistance(t, span, l->nodes[j + 1].flow);
        }
        solve_interior(&l->nodes[j], l->b, left, right);
    }
}

void textbook_run(textbook *t, size_t steps)
{
    const kent_model *m = t->model;
    for (size_t k = 0; k < steps; k++) {
        t->step++;
        for (size_t i = 0; i < m->span_count; i++) {
            run_line(t, i);
        }
        for (size_t i = 0; i < m->node_count; i++) {
            solve_node(t, &m->nodes[i]);
        }
        for (size_t i = 0; i < m->span_count; i++) {
            take_over(&t->lines[i]);
        }
    }
}

double textbook_head(const textbook *t, size_t span, size_t i)
{
    return t->lines[span].nodes[i].head;
}

double textbook_flow(const textbook *t, size_t span, size_t i)
{
    return t->lines[span].nodes[i].flow;
}

double textbook_highest(const textbook *t, size_t span, size_t i)
{
    return t->lines[span].nodes[i].highest;
}

double textbook_lowest(const textbook *t, size_t span, size_t i)
{
    return t->lines[span].nodes[i].lowest;
}
