#include "kent_cluster_internal.h"

#include <math.h>

enum {
    NEWTON_MOST = 200,   /* steps of Newton's method in all */
    NEWTON_AT_ONCE = 15, /* before members are also taken one after another */
    HALVINGS = 6,        /* of a step that brings nothing nearer */
    BISECTIONS = 40,     /* of a step that goes too far downhill */
    SWEEPS_MOST = 5000,  /* of one member after another, in all */
    TRIES = 400          /* of a search for one flow */
};
/* Of the heads at hand, and of what flows make of them: by how much an answer may miss
 * the heads of its nodes, and what is no change of head. */
static const double HOLDS = 2e-13, NO_CHANGE = 1e-14;
/* Of what a step promises, at least this share must come of it. */
static const double WORTHWHILE = 1e-4;
/* Of what the nodes make of a flow: a pivot that is none, and what is added then. */
static const double SINGULAR = 1e-10, DAMPING = 1e-2;

/* ---- laws of what has no state --------------------------------------------------- */

/* 7.15: its head but for what flows out, which loses velocity head and more. */
static kent_device_law level_law(const kent_level *level, double q, double head)
{
    const double loss = q < 0.0 ? level->loss : 0.0;
    return (kent_device_law){
        level->level + loss * q * fabs(q) - head, 2.0 * loss * fabs(q), {-1.0, 0.0}};
}

/* 7.17, and nothing where there is no pressure, and no more than is wanted: 12.4. */
static kent_device_law draw_law(const kent_draw *draw, double q, double head)
{
    const double most = draw->flow;
    if (most <= 0.0) return (kent_device_law){q - most, 1.0, {0.0, 0.0}};
    const double share = q / most;
    const double needed = draw->z + draw->full * share * fabs(share);
    const double asked = q + head - needed; /* 1 m2/s times a head is a flow */
    if (asked < 0.0) return (kent_device_law){q, 1.0, {0.0, 0.0}};
    if (asked > most) return (kent_device_law){q - most, 1.0, {0.0, 0.0}};
    return (kent_device_law){
        needed - head, 2.0 * draw->full * fabs(share) / most, {-1.0, 0.0}};
}

/* 7.18 */
static kent_device_law gate_law(const kent_gate *gate, double q, const double head[2])
{
    if (!(gate->capacity > 0.0)) return (kent_device_law){q, 1.0, {0.0, 0.0}};
    const double per = 1.0 / (gate->capacity * gate->capacity);
    return (kent_device_law){
        per * q * fabs(q) - (head[0] - head[1]), 2.0 * per * fabs(q), {-1.0, 1.0}};
}

/* 15.12: where the graph of 15.6 meets what flow and head make together. */
static kent_device_law hollow_law(const kent_hollow *h, double q, double head)
{
    if (!h) return (kent_device_law){q, 1.0, {0.0, 0.0}};
    const double rest = head + q * h->per_flow - h->limit;
    const kent_hollow_end end = kent_hollow_step(rest, h->volume, h->room, h->gas);
    return (kent_device_law){
        h->limit + end.rise - head, end.slope * h->per_flow, {end.slope - 1.0, 0.0}};
}

kent_device_law kent_member_law(const kent_member *member, double flow,
                                const double head[2])
{
    switch (member->kind) {
    case KENT_MEMBER_DEVICE:
        return member->ops->law(member->state, flow, head);
    case KENT_MEMBER_LEVEL:
        return level_law(member->level, flow, head[0]);
    case KENT_MEMBER_DRAW:
        return draw_law(member->draw, flow, head[0]);
    case KENT_MEMBER_GATE:
        return gate_law(member->gate, flow, head);
    case KENT_MEMBER_HOLLOW:
        return hollow_law(member->hollow, flow, head[0]);
    }
    return (kent_device_law){0};
}

/* ---- one flow -------------------------------------------------------------------- */

/* What one member sees of the rest: heads fall as its flow leaves, rise as it comes. */
typedef struct view {
    const kent_member *member;
    double head[2];     /* m, were its flow nil */
    double per_flow[2]; /* s/m2: 1/Y; 0 where a head stands */
} view;

static double law_at(const view *v, double flow, double *slope)
{
    const double head[2] = {v->head[0] - v->per_flow[0] * flow,
                            v->head[1] + v->per_flow[1] * flow};
    const kent_device_law law = kent_member_law(v->member, flow, head);
    *slope =
        law.by_flow - law.by_head[0] * v->per_flow[0] + law.by_head[1] * v->per_flow[1];
    return law.f;
}

typedef struct bracket {
    double low, high; /* m3/s: the law is below nil at low, above at high */
} bracket;

static double next_flow(const bracket *b, double flow, double f, double slope,
                        double stride, bool halve)
{
    const bool closed = isfinite(b->low) && isfinite(b->high);
    const double newton = flow - f / slope;
    const bool good = slope > 0.0 && isfinite(newton);
    if (closed) {
        if (good && !halve && newton > b->low && newton < b->high) return newton;
        return 0.5 * (b->low + b->high);
    }
    if (good && !halve) return newton;
    return f < 0.0 ? flow + stride : flow - stride;
}

/* The flow at which the law holds: Newton's method between brackets, halving them where
 * it makes no way. Since the law rises with flow (12.3) there is one such flow. False:
 * none was found. */
static bool find_flow(const view *v, double scale, double *flow, double *gap)
{
    const double per_flow = v->per_flow[0] + v->per_flow[1];
    bracket b = {-INFINITY, INFINITY};
    double q = *flow, before = INFINITY, stride = 1e-3 / per_flow;

    for (int i = 0; i < TRIES; i++) {
        double slope = 0.0;
        const double f = law_at(v, q, &slope);
        *flow = q;
        *gap = isnan(f) ? INFINITY : fabs(f);
        if (isnan(f)) return false;
        const bool holds = i > 0 && *gap * per_flow <= HOLDS * scale * slope;
        if (f == 0.0 || holds) return true;
        if (f < 0.0) b.low = q;
        if (f > 0.0) b.high = q;
        if ((b.high - b.low) * per_flow <= NO_CHANGE * scale ||
            b.high - b.low <= 4e-16 * fabs(q)) {
            return true;
        }
        q = next_flow(&b, q, f, slope, stride, *gap > 0.5 * before);
        before = *gap;
        stride *= 4.0;
    }
    return false;
}

/* ---- all flows together ---------------------------------------------------------- */

/* Laid out in the cluster's room. */
typedef struct work {
    double *flow, *trial, *f, *step; /* [member_count] */
    kent_device_law *law;            /* [member_count] */
    double *matrix;                  /* [member_count][member_count] */
} work;

enum { LAW_DOUBLES = sizeof(kent_device_law) / sizeof(double) };
_Static_assert(LAW_DOUBLES * sizeof(double) == sizeof(kent_device_law),
               "a law is doubles only");

size_t kent_cluster_room(size_t member_count)
{
    return member_count * (4 + LAW_DOUBLES + member_count);
}

static work lay_out(const kent_cluster *c)
{
    const size_t n = c->member_count;
    work w = {.flow = c->room};
    w.trial = w.flow + n;
    w.f = w.trial + n;
    w.step = w.f + n;
    w.matrix = w.step + n;
    w.law = (kent_device_law *)(void *)(w.matrix + n * n);
    return w;
}

/* 12.1 */
static void set_heads(kent_cluster *c, const double *flow)
{
    for (size_t i = 0; i < c->node_count; i++) {
        c->nodes[i].head = 0.0; /* what leaves */
    }
    for (size_t i = 0; i < c->member_count; i++) {
        const int *side = c->members[i].side;
        if (side[0] >= 0) c->nodes[side[0]].head += flow[i];
        if (side[1] >= 0) c->nodes[side[1]].head -= flow[i];
    }
    for (size_t i = 0; i < c->node_count; i++) {
        kent_cluster_node *node = &c->nodes[i];
        node->head = node->c - node->head / node->y;
    }
    for (size_t i = 0; i < c->member_count; i++) {
        kent_member *m = &c->members[i];
        for (int s = 0; s < 2; s++) {
            if (m->side[s] >= 0) m->head[s] = c->nodes[m->side[s]].head;
        }
    }
}

/* How far from an answer some flows are. */
typedef struct miss {
    double gap;   /* m: of the law furthest from holding; INFINITY: not a number */
    size_t worst; /* whose */
    double moves; /* m: about how far heads are from those of the answer */
    double scale; /* m: of which that is a small part, or not */
} miss;

/* Every law at these flows. */
static miss evaluate(kent_cluster *c, const work *w, const double *flow)
{
    miss is = {.scale = 1.0};
    for (size_t i = 0; i < c->node_count; i++) {
        is.scale = fmax(is.scale, fabs(c->nodes[i].c));
    }
    set_heads(c, flow);
    for (size_t i = 0; i < c->member_count; i++) {
        const kent_member *m = &c->members[i];
        const kent_device_law law = kent_member_law(m, flow[i], m->head);
        double per_flow = 0.0, slope = law.by_flow;
        for (int s = 0; s < 2; s++) {
            if (m->side[s] < 0) continue;
            const double per = 1.0 / c->nodes[m->side[s]].y;
            per_flow += per;
            slope += (s == 0 ? -per : per) * law.by_head[s];
        }
        is.scale = fmax(is.scale, fabs(flow[i]) * per_flow);
        w->law[i] = law;
        w->f[i] = law.f;
        const double gap = isnan(law.f) ? INFINITY : fabs(law.f);
        is.moves = fmax(is.moves, slope > 0.0 ? gap * per_flow / slope : gap);
        if (gap <= is.gap) continue;
        is.gap = gap;
        is.worst = i;
    }
    return is;
}

/* s/m2: how far the heads of a member's sides part or meet with its flow. */
static double per_flow_of(const kent_cluster *c, size_t member)
{
    const int *side = c->members[member].side;
    return (side[0] < 0 ? 0.0 : 1.0 / c->nodes[side[0]].y) +
           (side[1] < 0 ? 0.0 : 1.0 / c->nodes[side[1]].y);
}

/* 12.5: how every law changes with every flow. damping: share of what the nodes make of
 * a flow that its own law is said to add. */
static void fill_matrix(const kent_cluster *c, const work *w, double damping)
{
    const size_t n = c->member_count;
    for (size_t i = 0; i < n; i++) {
        const kent_member *m = &c->members[i];
        for (size_t j = 0; j < n; j++) {
            const kent_member *other = &c->members[j];
            double slope = i == j ? w->law[i].by_flow : 0.0;
            for (int s = 0; s < 2; s++) {
                const int at = m->side[s];
                if (at < 0) continue;
                const double per = w->law[i].by_head[s] / c->nodes[at].y;
                if (other->side[0] == at) slope -= per;
                if (other->side[1] == at) slope += per;
                if (i == j) slope += damping / c->nodes[at].y;
            }
            w->matrix[i * n + j] = slope;
        }
    }
}

static void swap_rows(const work *w, size_t n, size_t a, size_t b)
{
    for (size_t j = 0; j < n && a != b; j++) {
        const double kept = w->matrix[a * n + j];
        w->matrix[a * n + j] = w->matrix[b * n + j];
        w->matrix[b * n + j] = kept;
    }
    const double kept = w->step[a];
    w->step[a] = w->step[b];
    w->step[b] = kept;
}

/* Gauss's elimination with the largest pivot of each column. False: singular, or
 * nearly. */
static bool find_step(const kent_cluster *c, const work *w, double damping)
{
    const size_t n = c->member_count;
    double *const a = w->matrix;
    fill_matrix(c, w, damping);
    for (size_t i = 0; i < n; i++) {
        w->step[i] = -w->f[i];
    }
    for (size_t k = 0; k < n; k++) {
        size_t pivot = k;
        for (size_t i = k + 1; i < n; i++) {
            if (fabs(a[i * n + k]) > fabs(a[pivot * n + k])) pivot = i;
        }
        if (!(fabs(a[pivot * n + k]) > SINGULAR * per_flow_of(c, k))) return false;
        swap_rows(w, n, k, pivot);
        for (size_t i = k + 1; i < n; i++) {
            const double share = a[i * n + k] / a[k * n + k];
            for (size_t j = k + 1; j < n; j++) {
                a[i * n + j] -= share * a[k * n + j];
            }
            w->step[i] -= share * w->step[k];
        }
    }
    for (size_t k = n; k-- > 0;) {
        for (size_t j = k + 1; j < n; j++) {
            w->step[k] -= a[k * n + j] * w->step[j];
        }
        w->step[k] /= a[k * n + k];
        if (!isfinite(w->step[k])) return false;
    }
    return true;
}

static miss go(kent_cluster *c, const work *w, double share)
{
    for (size_t j = 0; j < c->member_count; j++) {
        w->trial[j] = w->flow[j] + share * w->step[j];
    }
    return evaluate(c, w, w->trial);
}

static void accept(const kent_cluster *c, const work *w, const miss *now, miss *is)
{
    for (size_t j = 0; j < c->member_count; j++) {
        w->flow[j] = w->trial[j];
    }
    *is = *now;
}

/* The longest share of the step that is worth while; false where none is. */
static bool search(kent_cluster *c, const work *w, miss *is)
{
    double share = 1.0;
    for (int i = 0; i < HALVINGS; i++, share *= 0.5) {
        const miss now = go(c, w, share);
        if (!(now.gap <= (1.0 - WORTHWHILE * share) * is->gap)) continue;
        accept(c, w, &now, is);
        return true;
    }
    return false;
}

/* Where laws bend sharply, no share of the step may bring all of them nearer. Then it
 * is followed until it no longer leads downhill: 12.6. */
static void follow(kent_cluster *c, const work *w, miss *is)
{
    double low = 0.0, high = 1.0;
    miss now = {0};
    for (int i = 0; i < BISECTIONS; i++) {
        const double share = i == 0 ? high : 0.5 * (low + high);
        double slope = 0.0;
        now = go(c, w, share);
        for (size_t j = 0; j < c->member_count; j++) {
            slope += w->f[j] * w->step[j];
        }
        if (slope <= 0.0) low = share;
        if (!(slope <= 0.0)) high = share;
        if (low >= high) break;
    }
    accept(c, w, &now, is);
}

static view view_of(const kent_cluster *c, size_t member, double flow)
{
    view v = {.member = &c->members[member]};
    for (int s = 0; s < 2; s++) {
        const int at = v.member->side[s];
        v.head[s] = v.member->head[s];
        if (at < 0) continue;
        v.per_flow[s] = 1.0 / c->nodes[at].y;
        v.head[s] += (s == 0 ? flow : -flow) * v.per_flow[s];
    }
    return v;
}

/* One member after another, the others' flows held. *moved: m, the largest change of
 * head. */
static bool sweep(kent_cluster *c, const work *w, double scale, double *moved)
{
    *moved = 0.0;
    for (size_t i = 0; i < c->member_count; i++) {
        double flow = w->flow[i], gap = 0.0;
        set_heads(c, w->flow);
        const view v = view_of(c, i, flow);
        if (!find_flow(&v, scale, &flow, &gap)) return false;
        *moved =
            fmax(*moved, fabs(flow - w->flow[i]) * (v.per_flow[0] + v.per_flow[1]));
        w->flow[i] = flow;
    }
    return true;
}

/* Leaves the answer in w->flow. At least one step is made: so that what changes a
 * little answers a little. */
static bool solve_together(kent_cluster *c, const work *w, miss *is)
{
    int sweeps = 0, at_once = 1;

    *is = evaluate(c, w, w->flow);
    for (int i = 0; i < NEWTON_MOST; i++) {
        if (i > 0 && is->moves <= HOLDS * is->scale) return true;
        const bool newton = i % (NEWTON_AT_ONCE + 1) < NEWTON_AT_ONCE;
        if (newton && (find_step(c, w, 0.0) || find_step(c, w, DAMPING))) {
            if (search(c, w, is)) continue;
            if (is->moves <= HOLDS * is->scale) return true;
            follow(c, w, is);
            continue;
        }
        if (is->moves <= HOLDS * is->scale) return true;
        for (int j = 0; j < at_once; j++) {
            double moved = 0.0;
            const bool found =
                ++sweeps <= SWEEPS_MOST && sweep(c, w, is->scale, &moved);
            *is = evaluate(c, w, w->flow);
            if (!found) return false;
            if (moved <= NO_CHANGE * is->scale) return true;
        }
        at_once *= 2;
    }
    return false;
}

/* A member by itself needs no matrix. Its one flow is the answer. */
static bool solve_alone(const kent_cluster *c, double *flow, double *gap)
{
    double scale = 1.0; /* m */
    view v = {.member = &c->members[0]};
    for (int s = 0; s < 2; s++) {
        const int at = v.member->side[s];
        v.head[s] = at < 0 ? v.member->head[s] : c->nodes[at].c;
        v.per_flow[s] = at < 0 ? 0.0 : 1.0 / c->nodes[at].y;
        scale = fmax(scale, fabs(v.head[s]));
    }
    return find_flow(&v, scale, flow, gap);
}

bool kent_cluster_solve(kent_cluster *c, size_t *worst, double *gap)
{
    const work w = lay_out(c);
    miss is = {0};
    bool solved = true;

    for (size_t i = 0; i < c->member_count; i++) {
        w.flow[i] = c->members[i].flow;
    }
    if (c->member_count == 1) {
        solved = solve_alone(c, w.flow, &is.gap);
    } else if (c->member_count > 1) {
        solved = solve_together(c, &w, &is);
    }
    set_heads(c, w.flow);
    for (size_t i = 0; i < c->member_count; i++) {
        c->members[i].flow = w.flow[i];
    }
    *worst = is.worst;
    *gap = is.gap;
    return solved;
}
