#include "kent_cavities_internal.h"

#include <float.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

const kent_cavity_heights KENT_CAVITY_HEIGHTS = {5.0, 7.5};
const double KENT_CAVITY_GAS = 1e-7;
const double KENT_CAVITY_LISTED = 1e-5;

static const double ATMOSPHERE = 101325.0; /* Pa, at which the gas is measured */

/* ---- records --------------------------------------------------------------------- */

/* What a place tells after a step. Returns whether more is to come. */
static bool follow(kent_pocket *k, double volume, double rise, double listed,
                   double time)
{
    if (k->rising) {
        k->rising = rise > k->peak;
        k->peak = fmax(k->peak, rise);
        k->pulse = fmax(k->pulse, k->peak);
    }
    if (!k->open && volume >= listed) {
        if (k->count == 0) {
            k->opened = time;
            k->closed = k->collapsed = k->pulse = (double)NAN;
        }
        k->count++;
        k->open = true;
        k->rising = false;
    } else if (k->open && volume < 0.5 * listed) {
        k->open = false;
        k->rising = true;
        if (isnan(k->closed)) k->closed = time;
        k->collapsed = time;
        k->peak = rise;
        k->pulse = fmax(k->pulse, rise); /* fmax takes the number */
    }
    if (volume >= listed && volume > k->largest) {
        k->largest = volume;
        k->largest_at = time;
    }
    return k->open || k->rising;
}

/* m3 that a place has when it wakes: by its gas law, as if it had been awake. Where the
 * head fell past the threshold within the step, that of the threshold. */
static double waking_volume(const kent_cavities *c, double gas, double rise)
{
    return gas > 0.0 ? gas / fmax(rise, c->heights.wakes) : 0.0;
}

/* The steady state has stood for long: its gas is what its own head asks. */
static double steady_volume(const kent_cavities *c, double gas, double rise)
{
    return gas > 0.0 && rise > 0.0 ? gas / rise : waking_volume(c, gas, rise);
}

/* ---- building -------------------------------------------------------------------- */

/* m per unit of free gas: 15.3. */
static double gas_head(const kent_model *m)
{
    if (m->solver.column_separation != KENT_SEPARATION_GAS) return 0.0;
    return KENT_CAVITY_GAS * ATMOSPHERE / (m->water.density * m->gravity);
}

static double vapour_limit(const kent_model *m, double z)
{
    return kent_vapour_head(&m->water, z, m->barometric, m->gravity);
}

static void describe_spans(kent_cavities *c, double step, const kent_waves *w)
{
    const kent_model *m = c->model;
    size_t at = 0;
    for (size_t i = 0; i < m->span_count; i++) { /* into the order of memory */
        at = i;
        while (at > 0 && c->spans[at - 1].first > w->first[i]) {
            c->spans[at] = c->spans[at - 1];
            c->span_index[at] = c->span_index[at - 1];
            at--;
        }
        const kent_span *span = &m->spans[i];
        const double reach = span->length / (double)w->reaches[i] * span->area; /* m3 */
        c->spans[at] = (kent_cavity_span){
            .room = 2.0 * step / w->impedance[i],
            .gas = reach * gas_head(m),
            .listed = reach * KENT_CAVITY_LISTED,
            .first = w->first[i],
            .reaches = w->reaches[i],
        };
        c->span_index[at] = (int)i;
        for (size_t n = 0; n <= w->reaches[i]; n++) {
            const double chainage = span->length * (double)n / (double)w->reaches[i];
            c->limit[w->first[i] + n] =
                vapour_limit(m, kent_span_level(m, span, chainage));
        }
    }
}

static void describe_blocks(kent_cavities *c, const kent_waves *w)
{
    size_t span = 0;
    for (size_t b = 0; b < w->block_total; b++) {
        size_t count = 0;
        const size_t first = kent_waves_block(w, b, &count);
        while (c->spans[span].first + c->spans[span].reaches < first) {
            span++;
        }
        c->block_span[b] = span;
        c->block_limit[b] = -INFINITY;
        for (size_t i = first; i < first + count; i++) {
            c->block_limit[b] = fmax(c->block_limit[b], c->limit[i]);
        }
    }
}

static void describe_knots(kent_cavities *c, double step, const kent_waves *w)
{
    const kent_ends *e = c->ends;
    const kent_model *m = c->model;
    for (size_t i = 0; i < e->knot_count; i++) {
        const kent_knot *knot = &e->knots[i];
        const kent_node *node = &m->nodes[knot->node];
        kent_hole *hole = &c->holes[i];
        double water = 0.0; /* m3, of half a reach in every span */
        for (size_t k = 0; k < node->end_count; k++) {
            const int span = m->ends[node->end_first + k].span;
            water += 0.5 * m->spans[span].area * m->spans[span].length /
                     (double)w->reaches[span];
        }
        c->knot_node[i] = e->tips[knot->tip_first].node;
        hole->hollow = (kent_hollow){
            .limit = node->kind == KENT_NODE_FIXED_LEVEL
                         ? -INFINITY
                         : vapour_limit(m, m->points[node->point].at.z),
            .room = step * knot->admittance,
            .per_flow = 1.0 / knot->admittance,
            .gas = water * gas_head(m),
        };
        hole->listed = water * KENT_CAVITY_LISTED;
        c->knot_wakes[i] = hole->hollow.limit + c->heights.wakes;
    }
}

/* ---- knots ----------------------------------------------------------------------- */

static double rise_at_knot(const kent_cavities *c, const kent_waves *w, size_t knot)
{
    return kent_waves_head(w, c->knot_node[knot]) - c->holes[knot].hollow.limit;
}

static bool knot_low(const kent_cavities *c, size_t knot)
{
    return c->ends->head[knot] < c->knot_wakes[knot];
}

/* Clusters come last. */
static size_t knots_alone(const kent_ends *e)
{
    const kent_run *last = e->run_count > 0 ? &e->runs[e->run_count - 1] : NULL;
    return last && last->kind == KENT_END_CLUSTER ? last->first : e->knot_count;
}

static bool some_knot_low(const kent_cavities *c)
{
    const size_t count = knots_alone(c->ends);
    const double *head = c->ends->head, *wakes = c->knot_wakes;
    int64_t low = 0; /* as wide as a head, for the compiler */
    for (size_t i = 0; i < count; i++) {
        low += head[i] < wakes[i] ? 1 : 0;
    }
    return low != 0;
}

static void wake_knot(kent_cavities *c, size_t knot, double volume)
{
    kent_hole *hole = &c->holes[knot];
    if (hole->awake || isinf(hole->hollow.limit)) return;
    hole->awake = true;
    hole->hollow.volume = volume;
    c->awake_knots++;
}

/* What a knot does once `taken` (m3/s) leaves it otherwise than through its spans.
 * Returns whether it may sleep. */
static bool settle_knot(kent_cavities *c, size_t knot, double taken, kent_waves *w,
                        double time)
{
    kent_hole *hole = &c->holes[knot];
    const kent_knot *at = &c->ends->knots[knot];
    const double arriving = kent_knot_arriving(c->ends, at, w);
    const double rest = arriving - taken * hole->hollow.per_flow - hole->hollow.limit;
    const kent_hollow_end end = kent_hollow_step(rest, hole->hollow.volume,
                                                 hole->hollow.room, hole->hollow.gas);
    kent_knot_send_back(c->ends, at, hole->hollow.limit + end.rise, w);
    hole->hollow.volume = end.volume;
    const bool busy = follow(&hole->pocket, end.volume, end.rise, hole->listed, time);
    return !busy && end.rise > c->heights.sleeps;
}

static void settle_alone(kent_cavities *c, size_t knot, double taken, kent_waves *w,
                         double time)
{
    if (!settle_knot(c, knot, taken, w, time)) return;
    c->holes[knot].awake = false;
    c->holes[knot].hollow.volume = 0.0;
    c->awake_knots--;
}

/* The knots from `first` that one answer covers, all awake if any is. */
static bool wake_together(kent_cavities *c, const kent_waves *w, size_t first,
                          size_t count)
{
    bool any = false;
    for (size_t i = first; i < first + count; i++) {
        any = any || c->holes[i].awake || knot_low(c, i);
    }
    for (size_t i = first; any && i < first + count; i++) {
        wake_knot(c, i,
                  waking_volume(c, c->holes[i].hollow.gas, rise_at_knot(c, w, i)));
    }
    return any;
}

static kent_hollow_side side_of(const kent_cavities *c, const kent_waves *w, size_t i)
{
    const kent_knot *knot = &c->ends->knots[i];
    return (kent_hollow_side){&c->holes[i].hollow, kent_knot_arriving(c->ends, knot, w),
                              knot->admittance};
}

/* m3/s that what stands at a knot takes from it. */
static double taken_at(const kent_cavities *c, const kent_waves *w, kent_end_kind kind,
                       size_t knot)
{
    const kent_ends *e = c->ends;
    const int device = e->knots[knot].device;
    kent_hollow_side side[2] = {side_of(c, w, knot)};
    switch (kind) {
    case KENT_END_OUTFLOW:
        return kent_hollow_draw(e->draws[device].flow, e->draws[device].z,
                                e->draws[device].full, side);
    case KENT_END_DISCHARGE:
        side[1].c = e->gates[device].level;
        return kent_hollow_gate(e->gates[device].capacity, side);
    case KENT_END_VALVE:
        side[1] = side_of(c, w, knot + 1);
        return kent_hollow_gate(e->gates[device].capacity, side);
    case KENT_END_DEAD:
    case KENT_END_JUNCTION:
    case KENT_END_FIXED_LEVEL:
    case KENT_END_CLUSTER:
    case KENT_END_KINDS:
        break;
    }
    return 0.0;
}

static void solve_knots(kent_cavities *c, kent_waves *w, double time)
{
    if (c->awake_knots == 0 && !some_knot_low(c)) return;
    for (size_t r = 0; r < c->ends->run_count; r++) {
        const kent_run *run = &c->ends->runs[r];
        const size_t group = run->kind == KENT_END_VALVE ? 2 : 1;
        const bool never = run->kind == KENT_END_FIXED_LEVEL;
        if (never || run->kind == KENT_END_CLUSTER) continue;
        for (size_t i = run->first; i < run->first + run->count; i += group) {
            if (!wake_together(c, w, i, group)) continue;
            const double taken = taken_at(c, w, run->kind, i);
            settle_alone(c, i, taken, w, time);
            if (group == 2) settle_alone(c, i + 1, -taken, w, time);
        }
    }
}

/* The answer of a cluster takes its hollows as they were; here they become what they
 * are. */
static void settle_clusters(kent_cavities *c, kent_waves *w, double time)
{
    const kent_stands *s = c->ends->stands;
    size_t knot = knots_alone(c->ends);
    for (size_t i = 0; i < s->cluster_count; i++) {
        const kent_cluster *k = &s->clusters[i];
        for (size_t n = 0; n < k->node_count; n++, knot++) {
            double taken = 0.0;
            for (size_t j = 0; j < k->member_count; j++) {
                const kent_member *member = &k->members[j];
                if (member->kind == KENT_MEMBER_HOLLOW) continue;
                if (member->side[0] == (int)n) taken += member->flow;
                if (member->side[1] == (int)n) taken -= member->flow;
            }
            if (isinf(c->holes[knot].hollow.limit)) continue;
            (void)settle_knot(c, knot, taken, w, time);
        }
    }
}

/* ---- blocks ---------------------------------------------------------------------- */

/* One span's share of a block: nodes first .. end - 1, those inside it inner .. last.
 */
typedef struct kent_piece {
    const kent_cavity_span *span;
    size_t first, end, inner, last;
} kent_piece;

/* The next piece from node `first` on of a block that ends at `end`. */
static kent_piece next_piece(const kent_cavity_span *span, size_t first, size_t end)
{
    const size_t tip = span->first + span->reaches; /* its last node */
    kent_piece piece = {span, first, end < tip + 1 ? end : tip + 1, first, 0};
    if (first == span->first) piece.inner = first + 1;
    piece.last = piece.end == tip + 1 ? tip : piece.end; /* before it */
    return piece;
}

static void wake_block(kent_cavities *c, kent_waves *w, size_t block,
                       double (*volume)(const kent_cavities *c, double gas,
                                        double rise))
{
    size_t count = 0;
    const size_t first = kent_waves_block(w, block, &count), end = first + count;
    const kent_cavity_span *span = &c->spans[c->block_span[block]];
    w->awake[block] = 1;
    c->awake_blocks++;
    for (kent_piece at = {.end = first}; at.end < end; span++) {
        at = next_piece(span, at.end, end);
        for (size_t i = at.first; i < at.end; i++) {
            const bool inside = i >= at.inner && i < at.last;
            c->head[i] = kent_waves_head(w, i);
            c->volume[i] =
                inside ? volume(c, span->gas, c->head[i] - c->limit[i]) : 0.0;
        }
    }
}

/* Heads and volumes of one piece. Returns its lowest head. */
static double solve_piece(kent_cavities *c, const kent_waves *w, const kent_piece *at)
{
    const double *p = w->p, *m = w->m;
    const double room = at->span->room, gas = at->span->gas;
    double lowest = INFINITY;
    for (size_t i = at->first; i < at->end; i++) {
        c->head[i] = 0.5 * (p[i] + m[i]);
    }
    for (size_t i = at->inner; i < at->last; i++) {
        const kent_hollow_end end =
            kent_hollow_step(c->head[i] - c->limit[i], c->volume[i], room, gas);
        c->head[i] = c->limit[i] + end.rise;
        c->volume[i] = end.volume;
    }
    for (size_t i = at->first; i < at->end; i++) {
        lowest = c->head[i] < lowest ? c->head[i] : lowest;
    }
    return lowest;
}

/* Whether any pocket of a piece is open or rising. */
static bool follow_piece(kent_cavities *c, const kent_piece *at, bool busy, double time)
{
    const double listed = at->span->listed;
    int open = busy;
    bool more = false;
    for (size_t i = at->inner; i < at->last; i++) {
        open |= c->volume[i] >= listed;
    }
    for (size_t i = at->inner; open && i < at->last; i++) {
        const double rise = c->head[i] - c->limit[i];
        if (follow(&c->pockets[i], c->volume[i], rise, listed, time)) more = true;
    }
    return more;
}

/* Heads and volumes of a block. Where all of it stands high and nothing of it is open,
 * it is drowsy. */
static void solve_block(kent_cavities *c, kent_waves *w, size_t block, double time)
{
    size_t count = 0;
    const size_t first = kent_waves_block(w, block, &count), end = first + count;
    const kent_cavity_span *span = &c->spans[c->block_span[block]];
    double lowest = INFINITY;
    bool busy = false;

    for (kent_piece at = {.end = first}; at.end < end; span++) {
        at = next_piece(span, at.end, end);
        lowest = fmin(lowest, solve_piece(c, w, &at));
        if (follow_piece(c, &at, c->busy[block], time)) busy = true;
    }
    c->busy[block] = busy;
    c->drowsy[block] = !busy && lowest > c->block_limit[block] + c->heights.sleeps;
}

/* Whether a block that sleeps has a head less than `above` (m) over its limit, and if
 * not, new floors for it, as far below its waves as they will go (15.10). */
static bool look(const kent_cavities *c, kent_waves *w, size_t block, double above)
{
    size_t count = 0;
    const size_t first = kent_waves_block(w, block, &count);
    const double *p = w->p + first, *m = w->m + first;
    const double wakes = c->block_limit[block] + c->heights.wakes;
    double twice = p[0] + m[0], least_p = p[0], least_m = m[0]; /* m */

    for (size_t i = 1; i < count; i++) {
        twice = p[i] + m[i] < twice ? p[i] + m[i] : twice;
        least_p = p[i] < least_p ? p[i] : least_p;
        least_m = m[i] < least_m ? m[i] : least_m;
    }
    w->low[block] = 0;
    if (twice < 2.0 * (c->block_limit[block] + above)) return true;
    const double lean = 0.5 * (least_p - least_m);
    w->floors[block] = (kent_floor){wakes + lean, wakes - lean};
    return false;
}

/* Drowsy at the instant before, and still high at this one were it to sleep. */
static bool falls_asleep(kent_cavities *c, kent_waves *w, size_t block)
{
    if (look(c, w, block, c->heights.sleeps)) return false;
    w->awake[block] = 0;
    c->awake_blocks--;
    return true;
}

/* The next block from `block` on that may be low or is awake. */
static size_t next_suspect(const kent_cavities *c, const kent_waves *w, size_t block)
{
    if (c->awake_blocks > 0) {
        while (block < w->block_total && !(w->low[block] | w->awake[block])) {
            block++;
        }
        return block;
    }
    const size_t left = w->block_total - block;
    const uint8_t *at = left > 0 ? memchr(w->low + block, 1, left) : NULL;
    return at ? (size_t)(at - w->low) : w->block_total;
}

void kent_cavities_solve(kent_cavities *c, kent_waves *w, double time)
{
    solve_knots(c, w, time);
    settle_clusters(c, w, time);
    for (size_t b = 0; (b = next_suspect(c, w, b)) < w->block_total; b++) {
        if (w->awake[b] && !(c->drowsy[b] && falls_asleep(c, w, b))) {
            solve_block(c, w, b, time);
        } else if (!w->awake[b] && look(c, w, b, c->heights.wakes)) {
            wake_block(c, w, b, waking_volume);
            solve_block(c, w, b, time);
        }
    }
}

/* ---- sweep ----------------------------------------------------------------------- */

static int64_t sweep_piece(const kent_cavities *c, const kent_drag *drag, kent_waves *w,
                           const kent_piece *at)
{
    const size_t span = (size_t)c->span_index[at->span - c->spans];
    const bool implicit = at->first >= w->explicit_total;
    const double limit = implicit ? DBL_MAX : KENT_EXPLICIT_LIMIT;
    int64_t beyond = 0;

    for (size_t i = at->first; i < at->end; i++) {
        const double p = w->p[i], m = w->m[i], twice = 2.0 * c->head[i];
        const double right = twice - 2.0 * m, left = 2.0 * p - twice; /* 2 B Q, 15.8 */
        const double k_right = kent_drag_of(drag, span, right, w->k[i]);
        const double k_left = kent_drag_of(drag, span, left, w->k[i]);
        const double kr = k_right * fabs(right), kl = k_left * fabs(left);
        w->twice_highest[i] = fmax(w->twice_highest[i], twice);
        w->twice_lowest[i] = fmin(w->twice_lowest[i], twice);
        if (!(kr <= limit) || !(kl <= limit)) { /* for the marcher to find */
            const double d = kr > kl ? right : left;
            w->k[i] = kr > kl ? k_right : k_left;
            w->p[i] = 0.5 * (twice + d);
            w->m[i] = 0.5 * (twice - d);
            beyond++;
            continue;
        }
        const double fr = kr * right, fl = kl * left;
        w->p[i] = twice - m - (implicit ? fr / (1.0 + 2.0 * kr) : fr);
        w->m[i] = twice - p + (implicit ? fl / (1.0 + 2.0 * kl) : fl);
    }
    return beyond;
}

static int64_t sweep_block(const kent_cavities *c, const kent_drag *drag, kent_waves *w,
                           size_t block)
{
    size_t count = 0;
    const size_t first = kent_waves_block(w, block, &count), end = first + count;
    const kent_cavity_span *span = &c->spans[c->block_span[block]];
    int64_t beyond = 0;
    for (kent_piece at = {.end = first}; at.end < end; span++) {
        at = next_piece(span, at.end, end);
        beyond += sweep_piece(c, drag, w, &at);
    }
    return beyond;
}

int64_t kent_cavities_sweep(const kent_cavities *c, const kent_drag *drag,
                            kent_waves *w)
{
    int64_t beyond = 0;
    for (size_t b = 0; c->awake_blocks > 0 && b < w->block_total; b++) {
        if (w->awake[b]) beyond += sweep_block(c, drag, w, b);
    }
    return beyond;
}

void kent_cavities_show(kent_cavities *c, kent_waves *w)
{
    for (size_t b = 0; c->awake_blocks > 0 && b < w->block_total; b++) {
        size_t count = 0;
        const size_t first = kent_waves_block(w, b, &count);
        if (!w->awake[b]) continue;
        for (size_t i = first; i < first + count; i++) {
            c->lean[i] = 0.5 * (w->p[i] + w->m[i]) - c->head[i];
            w->p[i] -= c->lean[i];
            w->m[i] -= c->lean[i];
        }
    }
}

void kent_cavities_hide(kent_cavities *c, kent_waves *w)
{
    for (size_t b = 0; b < w->block_total; b++) {
        size_t count = 0;
        const size_t first = kent_waves_block(w, b, &count);
        w->low[b] = 1; /* walls lowered the waves after the floors were watched */
        if (!w->awake[b]) continue;
        for (size_t i = first; i < first + count; i++) {
            w->p[i] += c->lean[i];
            w->m[i] += c->lean[i];
        }
    }
}

/* ---- the whole ------------------------------------------------------------------- */

/* Gives every member its hollow. */
static void start_clusters(kent_cavities *c, const kent_waves *w)
{
    const kent_stands *s = c->ends->stands;
    size_t knot = knots_alone(c->ends);
    for (size_t i = 0; i < s->cluster_count; i++) {
        const kent_cluster *k = &s->clusters[i];
        kent_member *member = &k->members[k->member_count - k->node_count];
        for (size_t n = 0; n < k->node_count; n++, knot++, member++) {
            kent_hollow *hollow = &c->holes[knot].hollow;
            if (isinf(hollow->limit)) continue;
            hollow->volume = steady_volume(c, hollow->gas, rise_at_knot(c, w, knot));
            member->hollow = hollow;
        }
    }
}

static void start(kent_cavities *c, kent_waves *w)
{
    const size_t alone = knots_alone(c->ends);
    for (size_t i = 0; i < alone; i++) {
        const double rise = rise_at_knot(c, w, i);
        if (rise >= c->heights.wakes) continue;
        wake_knot(c, i, steady_volume(c, c->holes[i].hollow.gas, rise));
    }
    start_clusters(c, w);
    for (size_t b = 0; b < w->block_total; b++) {
        if (look(c, w, b, c->heights.wakes)) wake_block(c, w, b, steady_volume);
    }
}

kent_status kent_cavities_new(const kent_model *m, double step,
                              kent_cavity_heights heights, kent_waves *w, kent_ends *e,
                              kent_cavities **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    const size_t nodes = w->node_total, knots = e->knot_count;
    kent_cavities *c = kent_alloc(1, sizeof *c);

    if (!c || kent_waves_watch(w, err) != KENT_OK) goto done;
    c->model = m;
    c->ends = e;
    c->heights = heights;
    c->spans = kent_alloc(m->span_count, sizeof *c->spans);
    c->span_index = kent_alloc(m->span_count, sizeof *c->span_index);
    c->block_span = kent_alloc(w->block_total, sizeof *c->block_span);
    c->block_limit = kent_alloc(w->block_total, sizeof *c->block_limit);
    c->busy = kent_alloc(w->block_total, sizeof *c->busy);
    c->drowsy = kent_alloc(w->block_total, sizeof *c->drowsy);
    c->limit = kent_alloc(nodes, sizeof *c->limit);
    c->head = kent_alloc(nodes, sizeof *c->head);
    c->volume = kent_alloc(nodes, sizeof *c->volume);
    c->lean = kent_alloc(nodes, sizeof *c->lean);
    c->pockets = kent_alloc(nodes, sizeof *c->pockets);
    c->holes = kent_alloc(knots, sizeof *c->holes);
    c->knot_node = kent_alloc(knots, sizeof *c->knot_node);
    c->knot_wakes = kent_alloc(knots, sizeof *c->knot_wakes);
    if (!c->spans || !c->span_index || !c->block_span || !c->block_limit || !c->busy ||
        !c->drowsy || !c->limit || !c->head || !c->volume || !c->lean || !c->pockets ||
        !c->holes || !c->knot_node || !c->knot_wakes) {
        goto done;
    }
    describe_spans(c, step, w);
    describe_blocks(c, w);
    describe_knots(c, step, w);
    start(c, w);
    *out = c;
    c = NULL;
    status = KENT_OK;
done:
    kent_cavities_free(c);
    return status == KENT_OK ? KENT_OK : kent_error_nomem(err);
}

void kent_cavities_free(kent_cavities *c)
{
    if (!c) return;
    free(c->spans);
    free(c->span_index);
    free(c->block_span);
    free(c->block_limit);
    free(c->busy);
    free(c->drowsy);
    free(c->limit);
    free(c->head);
    free(c->volume);
    free(c->lean);
    free(c->pockets);
    free(c->holes);
    free(c->knot_node);
    free(c->knot_wakes);
    free(c);
}

/* ---- what became of it ----------------------------------------------------------- */

double kent_cavities_at_node(const kent_cavities *c, int node)
{
    for (size_t i = 0; i < c->ends->knot_count; i++) {
        if (c->ends->knots[i].node == node) return c->holes[i].hollow.volume;
    }
    return 0.0;
}

static kent_cavity told(const kent_pocket *k, int span, double chainage, int node)
{
    return (kent_cavity){
        .span = span,
        .chainage = chainage,
        .node = node,
        .largest = k->largest,
        .largest_at = k->largest_at,
        .opened = k->opened,
        .closed = k->closed,
        .collapsed = k->collapsed,
        .count = k->count,
        .pulse = k->pulse,
    };
}

/* Largest first; of equals, nodes before grid points, then as they lie. */
static int by_size(const void *a, const void *b)
{
    const kent_cavity *x = a, *y = b;
    if (x->largest != y->largest) return x->largest > y->largest ? -1 : 1;
    if (x->span != y->span) return x->span < y->span ? -1 : 1;
    if (x->node != y->node) return x->node < y->node ? -1 : 1;
    return x->chainage < y->chainage ? -1 : 1;
}

/* Into the first `most`, the smallest of them giving way. */
static void keep(kent_cavity *out, size_t count, size_t most, kent_cavity cavity)
{
    size_t at = count;
    if (count >= most) {
        if (most == 0) return;
        at = 0;
        for (size_t i = 1; i < most; i++) {
            if (by_size(&out[i], &out[at]) > 0) at = i;
        }
        if (by_size(&cavity, &out[at]) > 0) return;
    }
    out[at] = cavity;
}

size_t kent_cavities_list(const kent_cavities *c, kent_cavity *out, size_t most)
{
    const kent_model *m = c->model;
    size_t count = 0;
    for (size_t i = 0; i < c->ends->knot_count; i++) {
        const kent_pocket *k = &c->holes[i].pocket;
        if (k->count == 0) continue;
        keep(out, count++, most, told(k, -1, (double)NAN, c->ends->knots[i].node));
    }
    for (size_t s = 0; s < m->span_count; s++) {
        const kent_cavity_span *span = &c->spans[s];
        const int index = c->span_index[s];
        for (size_t i = 1; i < span->reaches; i++) {
            const kent_pocket *k = &c->pockets[span->first + i];
            if (k->count == 0) continue;
            const double share = (double)i / (double)span->reaches;
            keep(out, count++, most,
                 told(k, index, share * m->spans[index].length, -1));
        }
    }
    const size_t kept = count < most ? count : most;
    if (kept > 1) qsort(out, kept, sizeof *out, by_size);
    return count;
}
