#include "kent_stands_internal.h"

#include <math.h>
#include <stdlib.h>

/* ---- which nodes belong together ------------------------------------------------- */

static int root(int *part, int n)
{
    while (part[n] != n) {
        n = part[n] = part[part[n]];
    }
    return n;
}

static void join(int *part, const int node[2])
{
    if (node[0] < 0 || node[1] < 0) return;
    const int a = root(part, node[0]), b = root(part, node[1]);
    part[a > b ? a : b] = a > b ? b : a;
}

static void mark(int *part, bool *taken, const int node[2])
{
    for (int s = 0; s < 2; s++) {
        if (node[s] >= 0) taken[root(part, node[s])] = true;
    }
}

/* Numbers the parts that hold a device into cluster_of, in order of their nodes. part
 * [node_count], taken [node_count]: to work in. */
static void find_clusters(kent_stands *s, int *part, bool *taken)
{
    const kent_model *m = s->model;
    for (size_t i = 0; i < m->node_count; i++) {
        part[i] = (int)i;
        s->cluster_of[i] = -1;
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        join(part, m->valves[i].node);
    }
    for (size_t i = 0; i < m->device_count; i++) {
        if (!s->absent[i]) join(part, m->devices[i].node);
    }
    for (size_t i = 0; i < m->device_count; i++) {
        if (!s->absent[i]) mark(part, taken, m->devices[i].node);
    }
    for (size_t i = 0; i < m->node_count; i++) {
        const int first = root(part, (int)i); /* never after i */
        if (!taken[first]) continue;
        s->cluster_of[i] =
            first == (int)i ? (int)s->cluster_count++ : s->cluster_of[first];
    }
}

/* ---- members --------------------------------------------------------------------- */

/* Where a cluster's nodes and members begin in their stores, while they are filled. */
typedef struct filling {
    kent_stands *stands;
    size_t cluster, node_count, member_count;
    int *place; /* [node_count] of each node in its cluster */
} filling;

static void add_nodes(filling *f, kent_cluster *c)
{
    kent_stands *s = f->stands;
    c->nodes = s->node_store + f->node_count;
    for (size_t i = 0; i < s->model->node_count; i++) {
        if (s->cluster_of[i] != (int)f->cluster) continue;
        f->place[i] = (int)c->node_count++;
        s->nodes[f->node_count++] = (int)i;
    }
}

static bool is_here(const filling *f, const int node[2])
{
    const int at = node[0] >= 0 ? node[0] : node[1];
    return at >= 0 && f->stands->cluster_of[at] == (int)f->cluster;
}

/* node: the model's, of its two sides; head: m, that of a side without one. */
static kent_member *add_member(filling *f, kent_cluster *c, kent_member_kind kind,
                               const int node[2], double head, double flow)
{
    kent_member *member = &f->stands->member_store[f->member_count++];
    if (c->member_count++ == 0) c->members = member;
    *member =
        (kent_member){.kind = kind, .head = {head, head}, .flow = flow, .device = -1};
    for (int s = 0; s < 2; s++) {
        member->side[s] = node[s] < 0 ? -1 : f->place[node[s]];
    }
    return member;
}

/* m: head of a device's side without a node. */
static double head_beside(const kent_model *m, const kent_device *d)
{
    return d->kind == KENT_DEVICE_PUMP ? m->pumps[d->index].suction_level
                                       : m->points[d->point].at.z;
}

static void add_devices(filling *f, kent_cluster *c, const kent_steady *steady)
{
    kent_stands *s = f->stands;
    for (size_t i = 0; i < s->model->device_count; i++) {
        const kent_device *d = &s->model->devices[i];
        if (s->absent[i] || !is_here(f, d->node)) continue;
        kent_member *member =
            add_member(f, c, KENT_MEMBER_DEVICE, d->node, head_beside(s->model, d),
                       steady->device_flow[i]);
        member->ops = KENT_DEVICE_OPS[d->kind];
        member->state = &s->states[i];
        member->device = (int)i;
        s->members[i] = member;
    }
}

static void add_old_kinds(filling *f, kent_cluster *c, const kent_steady *steady,
                          const kent_ends *e)
{
    const kent_model *m = f->stands->model;
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        const int node[2] = {m->fixed_levels[i].node, -1};
        if (!is_here(f, node)) continue;
        add_member(f, c, KENT_MEMBER_LEVEL, node, 0.0, 0.0)->level = &e->levels[i];
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        const int node[2] = {m->outflows[i].node, -1};
        if (!is_here(f, node)) continue;
        add_member(f, c, KENT_MEMBER_DRAW, node, 0.0, steady->outflow[i])->draw =
            &e->draws[i];
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        const int *node = m->valves[i].node;
        if (!is_here(f, node)) continue;
        const double level = node[1] < 0 ? m->valves[i].discharge_level : 0.0;
        add_member(f, c, KENT_MEMBER_GATE, node, level, steady->valve_flow[i])->gate =
            &e->gates[i];
    }
}

/* Where water may part, the last members of a cluster, in the order of its nodes. */
static void add_hollows(filling *f, kent_cluster *c)
{
    const kent_stands *s = f->stands;
    if (s->model->solver.column_separation == KENT_SEPARATION_NONE) return;
    for (size_t i = 0; i < c->node_count; i++) {
        const int node[2] = {s->nodes[f->node_count - c->node_count + i], -1};
        (void)add_member(f, c, KENT_MEMBER_HOLLOW, node, 0.0, 0.0);
    }
}

static void fill_clusters(kent_stands *s, const kent_steady *steady, const kent_ends *e,
                          int *place)
{
    filling f = {.stands = s, .place = place};
    for (; f.cluster < s->cluster_count; f.cluster++) {
        kent_cluster *c = &s->clusters[f.cluster];
        add_nodes(&f, c);
        add_devices(&f, c, steady);
        add_old_kinds(&f, c, steady, e);
        add_hollows(&f, c);
    }
}

/* ---- building -------------------------------------------------------------------- */

static kent_status start_devices(kent_stands *s, const kent_steady *steady,
                                 kent_error *err)
{
    const kent_model *m = s->model;
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        const kent_device_ops *ops = KENT_DEVICE_OPS[d->kind];
        if (s->absent[i]) continue;
        double head[2];
        for (int side = 0; side < 2; side++) {
            head[side] = d->node[side] < 0 ? head_beside(m, d)
                                           : steady->node_head[d->node[side]];
        }
        const kent_status status =
            ops->start(&s->states[i], m, d->index, steady->device_flow[i], head, err);
        if (status != KENT_OK) return status;
    }
    return KENT_OK;
}

/* One place to work in, that suits every cluster. */
static bool make_room(kent_stands *s)
{
    size_t most = 0; /* members */
    for (size_t i = 0; i < s->cluster_count; i++) {
        if (s->clusters[i].member_count > most) most = s->clusters[i].member_count;
    }
    s->room = kent_alloc(kent_cluster_room(most), sizeof *s->room);
    for (size_t i = 0; i < s->cluster_count; i++) {
        s->clusters[i].room = s->room;
    }
    return s->room != NULL;
}

kent_status kent_stands_new(const kent_model *m, const kent_steady *s, int scenario,
                            const kent_ends *e, kent_stands **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    const size_t nodes = m->node_count, devices = m->device_count;
    int *part = kent_alloc(nodes, sizeof *part);
    bool *taken = kent_alloc(nodes, sizeof *taken);
    kent_stands *k = kent_alloc(1, sizeof *k);

    if (!part || !taken || !k) goto done;
    k->model = m;
    k->states = kent_alloc(devices, sizeof *k->states);
    k->absent = kent_alloc(devices, sizeof *k->absent);
    k->members = kent_alloc(devices, sizeof(kent_member *));
    k->cluster_of = kent_alloc(nodes, sizeof *k->cluster_of);
    k->nodes = kent_alloc(nodes, sizeof *k->nodes);
    k->node_store = kent_alloc(nodes, sizeof *k->node_store);
    k->clusters = kent_alloc(nodes, sizeof *k->clusters);
    k->member_store = kent_alloc(devices + m->fixed_level_count + m->outflow_count +
                                     m->valve_count + nodes,
                                 sizeof *k->member_store);
    if (!k->states || !k->absent || !k->members || !k->cluster_of || !k->nodes ||
        !k->node_store || !k->clusters || !k->member_store) {
        goto done;
    }
    for (size_t i = 0; i < devices; i++) {
        k->absent[i] = kent_device_is_left_out(m, i, scenario);
    }
    find_clusters(k, part, taken);
    fill_clusters(k, s, e, part);
    if (!make_room(k)) goto done;
    status = start_devices(k, s, err);
    if (status != KENT_OK) goto done;
    *out = k;
    k = NULL;
done:
    free(part);
    free(taken);
    kent_stands_free(k);
    return status == KENT_E_NOMEM ? kent_error_nomem(err) : status;
}

void kent_stands_free(kent_stands *s)
{
    if (!s) return;
    free(s->states);
    free(s->absent);
    free((void *)s->members);
    free(s->cluster_of);
    free(s->nodes);
    free(s->node_store);
    free(s->clusters);
    free(s->member_store);
    free(s->room);
    free(s);
}

/* ---- marching -------------------------------------------------------------------- */

void kent_stands_move(kent_stands *s, const kent_schedule *schedule, double time,
                      double step)
{
    s->time = time;
    for (size_t i = 0; i < s->model->device_count; i++) {
        const kent_member *member = s->members[i];
        if (member) member->ops->move(member->state, schedule, time, step);
    }
}

static const char *name_of(const kent_stands *s, const kent_member *member)
{
    return member->device < 0 ? "what stands there"
                              : s->model->devices[member->device].id;
}

/* The point of a cluster's first node. */
static const char *place_of(const kent_stands *s, size_t cluster)
{
    const size_t at = (size_t)(s->clusters[cluster].nodes - s->node_store);
    return s->model->points[s->model->nodes[s->nodes[at]].point].id;
}

static void settle(kent_stands *s, const kent_member *member)
{
    if (member->kind != KENT_MEMBER_DEVICE) return;
    member->ops->settle(member->state, member->flow, member->head);
    const char *beyond =
        member->ops->beyond ? member->ops->beyond(member->state) : NULL;
    if (!beyond) return;
    const kent_device *d = &s->model->devices[member->device];
    (void)kent_error_set(&s->stopped, KENT_E_SOLVE, "", "%s \"%s\" %s (after %.4g s)",
                         kent_device_word(d->kind), d->id, beyond, s->time);
}

void kent_stands_solve(kent_stands *s, size_t cluster)
{
    kent_cluster *c = &s->clusters[cluster];
    size_t worst = 0;
    double gap = 0.0;
    if (!kent_cluster_solve(c, &worst, &gap)) {
        (void)kent_error_set(
            &s->stopped, KENT_E_SOLVE, "",
            "point %s after %.4g s: no flow suits all that stands there; %s misses its "
            "law by %.3g m",
            place_of(s, cluster), s->time, name_of(s, &c->members[worst]), gap);
        return;
    }
    for (size_t i = 0; i < c->member_count; i++) {
        settle(s, &c->members[i]);
    }
}

const char *kent_stands_caution(const kent_stands *s, size_t device)
{
    const kent_member *member = s->members[device];
    return member && member->ops->caution ? member->ops->caution(member->state) : NULL;
}

void kent_stands_tell(const kent_stands *s, kent_device_row *rows)
{
    for (size_t i = 0; i < s->model->device_count; i++) {
        const kent_member *member = s->members[i];
        for (int j = 0; j < KENT_TOLD; j++) {
            rows[i].told[j] = (double)NAN;
        }
        rows[i].flow = member ? member->flow : 0.0;
        if (member && member->ops->tell) member->ops->tell(member->state, rows[i].told);
    }
}
