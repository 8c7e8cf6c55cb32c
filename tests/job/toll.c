#include "toll.h"

#include "kent_recall_internal.h"

#include <math.h>
#include <stdlib.h>

enum { TERMS = KENT_FADES };

/* One kind of memory: a sum of terms at every grid point. */
typedef struct memory {
    size_t count;
    double fade[TERMS], gain[TERMS], share;
    double *v; /* [count][nodes] m */
} memory;

struct toll {
    const kent_model *model;
    const kent_span *span;
    size_t nodes;
    double b, step;   /* s/m2, s */
    double stiffness; /* -, of friction; 0: swept explicitly */
    double constant;  /* m3/s, whose factor every flow has; 0: its own */
    bool rubs;
    memory past, wall;
    double *d, *rest; /* [nodes] m: 2 B Q as the past has it, head at rest */
};

/* ---- building -------------------------------------------------------------------- */

static bool make_room(memory *k, size_t nodes)
{
    k->v = kent_alloc(k->count * nodes, sizeof *k->v);
    return k->v != NULL;
}

/* 16.14 */
static void describe_past(toll *t, double flow)
{
    const kent_span *s = t->span;
    const double steady = fabs(flow) / s->area;
    const double speed = steady < KENT_RECALL_SLOW ? KENT_RECALL_AT_REST : steady;
    const double nu = s->friction.kinematic_viscosity;
    const double step = 4.0 * nu * t->step / (s->bore * s->bore);
    const kent_weighting w = kent_weighting_sum(speed * s->bore / nu, step);
    t->past.count = w.count;
    t->past.share = 2.0 * w.at_once;
    for (size_t i = 0; i < w.count; i++) {
        const double fade = exp(-w.rate[i] * step);
        const double acts = 2.0 * w.weight[i] * (1.0 - fade) / w.rate[i];
        t->past.fade[i] = fade;
        t->past.gain[i] = fade * acts;
        t->past.share += acts;
    }
}

/* 16.22 */
static void describe_wall(toll *t, double wave_speed)
{
    const kent_pipe *pipe = &t->model->pipes[t->span->pipe];
    const double soft = kent_recall_softness(t->model, t->span, wave_speed);
    t->wall.count = pipe->creep_count;
    for (size_t i = 0; i < pipe->creep_count; i++) {
        const kent_creep *element = &t->model->creep[pipe->creep_first + i];
        const double fade = exp(-t->step / element->time);
        const double yields = (1.0 - fade) * soft * element->compliance;
        t->wall.fade[i] = fade;
        t->wall.gain[i] = (1.0 - fade) * yields;
        t->wall.share += yields;
    }
}

/* s2/m5: R of one reach (7.5), by the friction factor of a flow (m3/s). */
static double resistance(const toll *t, double flow)
{
    const double q = fmax(fabs(flow), 1e-12);
    double slope = 0.0;
    return kent_span_loss(t->model, t->span, q, &slope) /
           ((double)(t->nodes - 1) * q * q);
}

/* 7.11: from R|Q|/(2B) of an eighth on, at 1 m/s or in the steady state. */
static void describe_friction(toll *t, double flow)
{
    const bool constant = t->model->solver.friction == KENT_SURGE_CONSTANT;
    const double fast = fmax(fabs(flow), t->span->area); /* m3/s */
    if (constant) t->constant = flow == 0.0 ? t->span->area : fabs(flow);
    if (resistance(t, fast) * fast / (2.0 * t->b) <= 0.125) return;
    t->stiffness = 1.0 / (1.0 - resistance(t, flow) * fabs(flow) / t->b);
}

toll *toll_new(const kent_model *m, const kent_steady *s, const kent_grid *grid,
               size_t span)
{
    const kent_solver *solver = &m->solver;
    toll *t = kent_alloc(1, sizeof *t);
    if (!t) return NULL;
    t->model = m;
    t->span = &m->spans[span];
    t->nodes = (size_t)grid->reaches[span] + 1;
    t->step = grid->step;
    t->b = grid->wave_speed_used[span] / (m->gravity * t->span->area);
    t->rubs = solver->friction != KENT_SURGE_NONE;
    const bool remembers = solver->friction == KENT_SURGE_UNSTEADY &&
                           t->span->friction.law != KENT_FRICTIONLESS;
    if (t->rubs) describe_friction(t, s->span_flow[span]);
    if (remembers) describe_past(t, s->span_flow[span]);
    if (solver->creep && m->pipes[t->span->pipe].creep_count > 0) {
        describe_wall(t, grid->wave_speed_used[span]);
    }
    t->d = kent_alloc(t->nodes, sizeof *t->d);
    t->rest = kent_alloc(t->nodes, sizeof *t->rest);
    if (!t->d || !t->rest || !make_room(&t->past, t->nodes) ||
        !make_room(&t->wall, t->nodes)) {
        toll_free(t);
        return NULL;
    }
    for (size_t i = 0; i < t->nodes; i++) {
        const double share = (double)i / (double)(t->nodes - 1);
        t->d[i] = 2.0 * t->b * s->span_flow[span];
        t->rest[i] = (1.0 - share) * s->node_head[t->span->node[0]] +
                     share * s->node_head[t->span->node[1]];
    }
    return t;
}

void toll_free(toll *t)
{
    if (!t) return;
    free(t->past.v);
    free(t->wall.v);
    free(t->d);
    free(t->rest);
    free(t);
}

/* ---- one instant ----------------------------------------------------------------- */

static double remembered(const memory *k, size_t nodes, size_t node)
{
    double sum = 0.0;
    for (size_t i = 0; i < k->count; i++) {
        sum += k->v[i * nodes + node];
    }
    return sum;
}

static void feed(memory *k, size_t nodes, size_t node, double x)
{
    for (size_t i = 0; i < k->count; i++) {
        double *v = &k->v[i * nodes + node];
        *v = k->fade[i] * *v + k->gain[i] * x;
    }
}

/* m: 16.15 */
static double pull_at(toll *t, size_t node, double flow)
{
    if (t->past.count == 0) return 0.0;
    const double d = 2.0 * t->b * flow, share = t->past.share;
    const double pull =
        (remembered(&t->past, t->nodes, node) + share * (d - t->d[node])) /
        (1.0 + share);
    feed(&t->past, t->nodes, node, d - pull - t->d[node]);
    t->d[node] = d - pull;
    return pull;
}

/* m that a wave loses to the wall: 16.23 */
static double yield_at(toll *t, size_t node, double head)
{
    if (t->wall.count == 0) return 0.0;
    const double h = head - t->rest[node];
    const double sum = remembered(&t->wall, t->nodes, node);
    const double loss = (t->wall.share * h - sum) / (1.0 + 0.5 * t->wall.share);
    feed(&t->wall, t->nodes, node, h - 0.5 * loss);
    return loss;
}

/* m: 7.7, 7.10 */
static double rub(const toll *t, double flow)
{
    if (!t->rubs) return 0.0;
    const double r = resistance(t, t->constant > 0.0 ? t->constant : flow);
    if (t->stiffness == 0.0) return r * flow * fabs(flow);
    const double stiff = r * t->stiffness;
    return stiff * flow * fabs(flow) / (1.0 + stiff * fabs(flow) / t->b);
}

double toll_take(toll *t, const double *head, const double *flow, const double *parted,
                 double *rough)
{
    const size_t last = t->nodes - 1;
    double sum = 0.0; /* m */
    *rough = 0.0;
    for (size_t i = 0; i <= last; i++) {
        const bool inside = i > 0 && i < last;
        const double pull = pull_at(t, i, flow[i]);
        sum += (inside ? 2.0 : 1.0) * yield_at(t, i, head[i]);
        if (inside && parted[i] == 0.0) continue;
        const double mean = flow[i] - pull / t->b; /* that is left: 16.15 */
        const double half = inside ? 0.5 * parted[i] : 0.0;
        const double right = i == last ? 0.0 : rub(t, mean + half);
        const double left = i == 0 ? 0.0 : rub(t, mean - half);
        sum += right - left;
        *rough += fabs(right) + fabs(left);
        if (!inside) sum += i == 0 ? pull : -pull;
    }
    *rough *= 0.5 * t->step / t->b;
    return 0.5 * sum * t->step / t->b;
}
