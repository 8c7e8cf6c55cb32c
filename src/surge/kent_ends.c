#include "kent_stands_internal.h"

#include <math.h>
#include <stdlib.h>

/* ---- laws ------------------------------------------------------------------------ */

double kent_level_head(const kent_level *level, double c, double y)
{
    const double rise = level->level - c;
    if (rise <= 0.0) return level->level; /* inflow into it loses nothing */
    /* 7.15: loss Q^2 + Q/Y = level - C */
    const double flow =
        2.0 * rise / (1.0 / y + sqrt(1.0 / (y * y) + 4.0 * level->loss * rise));
    return c + flow / y;
}

double kent_draw_head(const kent_draw *draw, double c, double y)
{
    const double whole = c - draw->flow / y;
    if (draw->flow <= 0.0) return whole; /* feeds the main, whatever the pressure */
    if (whole >= draw->z + draw->full) return whole;
    if (c <= draw->z) return c;            /* no pressure: nothing is drawn */
    if (draw->full <= 0.0) return draw->z; /* draws what keeps the pressure at nil */
    /* 7.17: h + b sqrt(h) = C - z, b = flow/(Y sqrt(full)) */
    const double b = draw->flow / (y * sqrt(draw->full)), rise = c - draw->z;
    const double root = 2.0 * rise / (b + sqrt(b * b + 4.0 * rise));
    return draw->z + root * root;
}

double kent_gate_flow(double capacity, double c, double inverse_y)
{
    const double drop = fabs(c);
    if (!(capacity > 0.0) || drop == 0.0) return 0.0;
    /* 7.18: Q|Q|/E^2 + Q sum 1/Y = difference of C, times E^2 so that E may be nil */
    const double ze = inverse_y * capacity;
    return copysign(2.0 * drop * capacity / (ze + sqrt(ze * ze + 4.0 * drop)), c);
}

/* ---- kinds ----------------------------------------------------------------------- */

/* line[side][node]: the wave that arrives there; line[!side][node]: the one that leaves
 */
typedef double *const kent_line[2];

static double arriving(const kent_tip *tip, size_t count, kent_line line)
{
    double c = 0.0;
    for (size_t i = 0; i < count; i++) {
        c += tip[i].weight * line[tip[i].side][tip[i].node];
    }
    return c;
}

static void send_back(const kent_tip *tip, size_t count, double head, kent_line line)
{
    const double twice = 2.0 * head;
    for (size_t i = 0; i < count; i++) {
        line[tip[i].side ^ 1U][tip[i].node] = twice - line[tip[i].side][tip[i].node];
    }
}

static void solve_dead(const kent_ends *e, const kent_run *run, kent_line line)
{
    const kent_tip *tip = e->tips + e->knots[run->first].tip_first;
    double *head = e->head + run->first;
    for (size_t i = 0; i < run->count; i++) {
        head[i] = line[tip[i].side][tip[i].node];
        line[tip[i].side ^ 1U][tip[i].node] = head[i];
    }
}

/* Inlined with a constant number of tips where most junctions are. */
static inline __attribute__((always_inline)) void solve_alike(const kent_tip *tip,
                                                              size_t tips, size_t count,
                                                              double *restrict head,
                                                              kent_line line)
{
    for (size_t i = 0; i < count; i++, tip += tips) {
        head[i] = arriving(tip, tips, line);
        send_back(tip, tips, head[i], line);
    }
}

static void solve_junction(const kent_ends *e, const kent_run *run, kent_line line)
{
    const kent_tip *tip = e->tips + e->knots[run->first].tip_first;
    double *head = e->head + run->first;
    switch (run->tip_count) {
    case 2:
        solve_alike(tip, 2, run->count, head, line);
        break;
    case 3:
        solve_alike(tip, 3, run->count, head, line);
        break;
    case 4:
        solve_alike(tip, 4, run->count, head, line);
        break;
    default:
        solve_alike(tip, run->tip_count, run->count, head, line);
    }
}

static void solve_fixed_level(const kent_ends *e, const kent_run *run, kent_line line)
{
    for (size_t i = 0; i < run->count; i++) {
        const kent_knot *j = &e->knots[run->first + i];
        const kent_tip *tip = e->tips + j->tip_first;
        const double c = arriving(tip, j->tip_count, line);
        double *head = &e->head[run->first + i];
        *head = kent_level_head(&e->levels[j->device], c, j->admittance);
        send_back(tip, j->tip_count, *head, line);
    }
}

static void solve_outflow(const kent_ends *e, const kent_run *run, kent_line line)
{
    for (size_t i = 0; i < run->count; i++) {
        const kent_knot *j = &e->knots[run->first + i];
        const kent_tip *tip = e->tips + j->tip_first;
        const double c = arriving(tip, j->tip_count, line);
        double *head = &e->head[run->first + i];
        *head = kent_draw_head(&e->draws[j->device], c, j->admittance);
        send_back(tip, j->tip_count, *head, line);
    }
}

static void solve_discharge(const kent_ends *e, const kent_run *run, kent_line line)
{
    for (size_t i = 0; i < run->count; i++) {
        const kent_knot *j = &e->knots[run->first + i];
        const kent_gate *gate = &e->gates[j->device];
        const kent_tip *tip = e->tips + j->tip_first;
        const double c = arriving(tip, j->tip_count, line);
        const double flow =
            kent_gate_flow(gate->capacity, c - gate->level, 1.0 / j->admittance);
        double *head = &e->head[run->first + i];
        *head = c - flow / j->admittance;
        send_back(tip, j->tip_count, *head, line);
    }
}

static void solve_valve(const kent_ends *e, const kent_run *run, kent_line line)
{
    for (size_t i = 0; i < run->count; i += 2) {
        const kent_knot *a = &e->knots[run->first + i], *b = a + 1;
        const kent_tip *tip_a = e->tips + a->tip_first, *tip_b = e->tips + b->tip_first;
        const double c_a = arriving(tip_a, a->tip_count, line);
        const double c_b = arriving(tip_b, b->tip_count, line);
        const double flow = kent_gate_flow(e->gates[a->device].capacity, c_a - c_b,
                                           1.0 / a->admittance + 1.0 / b->admittance);
        double *head = &e->head[run->first + i];
        head[0] = c_a - flow / a->admittance;
        head[1] = c_b + flow / b->admittance;
        send_back(tip_a, a->tip_count, head[0], line);
        send_back(tip_b, b->tip_count, head[1], line);
    }
}

static void solve_cluster(const kent_ends *e, const kent_run *run, kent_line line)
{
    const kent_knot *first = e->knots + run->first;
    for (size_t i = 0; i < e->stands->cluster_count; i++) {
        const kent_cluster *c = &e->stands->clusters[i];
        for (size_t n = 0; n < c->node_count; n++) {
            c->nodes[n].c =
                arriving(e->tips + first[n].tip_first, first[n].tip_count, line);
        }
        kent_stands_solve(e->stands, i);
        for (size_t n = 0; n < c->node_count; n++, first++) {
            send_back(e->tips + first->tip_first, first->tip_count, c->nodes[n].head,
                      line);
        }
    }
}

/* In the order of kent_end_kind. */
static const struct {
    void (*solve)(const kent_ends *e, const kent_run *run, kent_line line);
    bool sorted_by_tips; /* false: the order of its knots has a meaning */
} KINDS[KENT_END_KINDS] = {
    [KENT_END_DEAD] = {solve_dead, true},
    [KENT_END_JUNCTION] = {solve_junction, true},
    [KENT_END_FIXED_LEVEL] = {solve_fixed_level, true},
    [KENT_END_OUTFLOW] = {solve_outflow, true},
    [KENT_END_DISCHARGE] = {solve_discharge, true},
    [KENT_END_VALVE] = {solve_valve, false},
    [KENT_END_CLUSTER] = {solve_cluster, false},
};

void kent_ends_solve(const kent_ends *e, kent_waves *w)
{
    kent_line line = {w->m, w->p};
    for (size_t i = 0; i < e->run_count; i++) {
        KINDS[e->runs[i].kind].solve(e, &e->runs[i], line);
    }
}

double kent_knot_arriving(const kent_ends *e, const kent_knot *knot,
                          const kent_waves *w)
{
    kent_line line = {w->m, w->p};
    return arriving(e->tips + knot->tip_first, knot->tip_count, line);
}

void kent_knot_send_back(const kent_ends *e, const kent_knot *knot, double head,
                         const kent_waves *w)
{
    kent_line line = {w->m, w->p};
    send_back(e->tips + knot->tip_first, knot->tip_count, head, line);
}

/* ---- building -------------------------------------------------------------------- */

static kent_end_kind kind_of(const kent_model *m, const kent_node *node)
{
    switch (node->kind) {
    case KENT_NODE_FIXED_LEVEL:
        return KENT_END_FIXED_LEVEL;
    case KENT_NODE_OUTFLOW:
        return KENT_END_OUTFLOW;
    case KENT_NODE_VALVE:
        return m->valves[node->device].node[1] < 0 ? KENT_END_DISCHARGE
                                                   : KENT_END_VALVE;
    case KENT_NODE_JUNCTION:
        break;
    }
    return node->end_count == 1 ? KENT_END_DEAD : KENT_END_JUNCTION;
}

static void add_knot(kent_ends *e, const kent_model *m, const kent_waves *w, int node)
{
    const kent_node *at = &m->nodes[node];
    kent_knot *j = &e->knots[e->knot_count++];

    *j = (kent_knot){e->tip_count, at->end_count, 0.0, at->device, node};
    for (size_t i = 0; i < at->end_count; i++) {
        const kent_end *end = &m->ends[at->end_first + i];
        const size_t span = (size_t)end->span;
        const size_t last = end->side == 1 ? w->reaches[span] : 0;
        e->tips[e->tip_count++] =
            (kent_tip){(uint32_t)(w->first[span] + last), (uint32_t)end->side,
                       1.0 / w->impedance[span]};
        j->admittance += 1.0 / w->impedance[span];
    }
    for (size_t i = 0; i < at->end_count; i++) {
        e->tips[j->tip_first + i].weight /= j->admittance;
    }
}

static void open_run(kent_ends *e, kent_end_kind kind, size_t tips)
{
    e->runs[e->run_count++] = (kent_run){kind, e->knot_count, 0, tips};
}

static void close_run(kent_ends *e)
{
    kent_run *run = &e->runs[e->run_count - 1];
    run->count = e->knot_count - run->first;
    if (run->count == 0) e->run_count--;
}

/* All knots of one kind with one number of tips; tips 0: whatever their number. */
static void add_alike(kent_ends *e, const kent_model *m, const kent_waves *w,
                      kent_end_kind kind, size_t tips)
{
    open_run(e, kind, tips);
    for (size_t i = 0; i < m->node_count; i++) {
        const kent_node *node = &m->nodes[i];
        if (node->end_count == 0 || kind_of(m, node) != kind) continue;
        if (e->stands->cluster_of[i] >= 0) continue;
        if (node->end_count == tips) add_knot(e, m, w, (int)i);
    }
    close_run(e);
}

static void add_valves(kent_ends *e, const kent_model *m, const kent_waves *w)
{
    open_run(e, KENT_END_VALVE, 0);
    for (size_t i = 0; i < m->valve_count; i++) {
        const int *node = m->valves[i].node;
        if (node[1] < 0 || e->stands->cluster_of[node[0]] >= 0) continue;
        add_knot(e, m, w, node[0]);
        add_knot(e, m, w, node[1]);
    }
    close_run(e);
}

static void add_clusters(kent_ends *e, const kent_model *m, const kent_waves *w)
{
    const int *node = e->stands->nodes;
    open_run(e, KENT_END_CLUSTER, 0);
    for (size_t i = 0; i < e->stands->cluster_count; i++) {
        const kent_cluster *c = &e->stands->clusters[i];
        for (size_t n = 0; n < c->node_count; n++) {
            add_knot(e, m, w, *node++);
            c->nodes[n].y = e->knots[e->knot_count - 1].admittance;
        }
    }
    close_run(e);
}

static double largest_area(const kent_model *m, int node)
{
    double area = 0.0; /* m2 */
    const kent_node *at = &m->nodes[node];
    for (size_t i = 0; i < at->end_count; i++) {
        area = fmax(area, m->spans[m->ends[at->end_first + i].span].area);
    }
    return area;
}

static void set_capacity(kent_gate *gate, double opening)
{
    gate->capacity = gate->full_capacity *
                     kent_valve_relative_capacity(&gate->valve->curve, opening);
}

static void describe_devices(kent_ends *e, const kent_model *m, const kent_steady *s)
{
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        const kent_fixed_level *f = &m->fixed_levels[i];
        const double area = f->node < 0 ? 0.0 : largest_area(m, f->node);
        if (area <= 0.0) continue; /* nothing is connected */
        e->levels[i].level = f->level;
        e->levels[i].loss = (1.0 + f->loss) / (2.0 * m->gravity * area * area);
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        const kent_outflow *o = &m->outflows[i];
        e->draws[i].flow = o->flow;
        e->draws[i].z = m->points[o->point].at.z;
        e->draws[i].full = o->pressure_dependent
                               ? o->full_pressure / (m->water.density * m->gravity)
                               : 0.0;
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        e->gates[i].valve = &m->valves[i];
        e->gates[i].level = m->valves[i].discharge_level;
        e->gates[i].full_capacity = s->valve_capacity[i];
        set_capacity(&e->gates[i], m->valves[i].opening);
    }
}

kent_status kent_ends_new(const kent_model *m, const kent_steady *s,
                          const kent_waves *w, int scenario, kent_ends **out,
                          kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    size_t most = 1; /* tips of one node */
    kent_ends *e = kent_alloc(1, sizeof *e);

    if (!e) goto done;
    for (size_t i = 0; i < m->node_count; i++) {
        if (m->nodes[i].end_count > most) most = m->nodes[i].end_count;
    }
    e->tips = kent_alloc(2 * m->span_count, sizeof *e->tips);
    e->knots = kent_alloc(m->node_count, sizeof *e->knots);
    e->head = kent_alloc(m->node_count, sizeof *e->head);
    e->runs = kent_alloc(KENT_END_KINDS * most + 1, sizeof *e->runs);
    e->levels = kent_alloc(m->fixed_level_count, sizeof *e->levels);
    e->draws = kent_alloc(m->outflow_count, sizeof *e->draws);
    e->gates = kent_alloc(m->valve_count, sizeof *e->gates);
    if (!e->tips || !e->knots || !e->head || !e->runs || !e->levels || !e->draws ||
        !e->gates) {
        goto done;
    }
    describe_devices(e, m, s);
    status = kent_stands_new(m, s, scenario, e, &e->stands, err);
    if (status != KENT_OK) goto done;
    for (int kind = 0; kind < KENT_END_KINDS; kind++) {
        if (!KINDS[kind].sorted_by_tips) continue;
        for (size_t tips = 1; tips <= most; tips++) {
            add_alike(e, m, w, (kent_end_kind)kind, tips);
        }
    }
    add_valves(e, m, w);
    add_clusters(e, m, w);
    *out = e;
    e = NULL;
done:
    kent_ends_free(e);
    return status == KENT_E_NOMEM ? kent_error_nomem(err) : status;
}

void kent_ends_free(kent_ends *e)
{
    if (!e) return;
    free(e->tips);
    free(e->knots);
    free(e->head);
    free(e->runs);
    free(e->levels);
    free(e->draws);
    free(e->gates);
    kent_stands_free(e->stands);
    free(e);
}

void kent_ends_move(kent_ends *e, const kent_schedule *schedule, double time,
                    double step)
{
    for (size_t i = 0; i < schedule->course_count; i++) {
        const kent_course *course = &schedule->courses[i];
        const double value = kent_schedule_value(schedule, course, time);
        switch (course->kind) {
        case KENT_EVENT_VALVE:
            set_capacity(&e->gates[course->target], value);
            break;
        case KENT_EVENT_OUTFLOW:
            e->draws[course->target].flow = value;
            break;
        case KENT_EVENT_FIXED_LEVEL:
            e->levels[course->target].level = value;
            break;
        case KENT_EVENT_PUMP:
        case KENT_EVENT_BURST:
            break; /* asked by the device itself */
        }
    }
    kent_stands_move(e->stands, schedule, time, step);
}
