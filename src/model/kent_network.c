#include "kent_model_internal.h"

#include <assert.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { NAMED_POINTS = 5 }; /* of a part cut off, in a complaint */

static bool is_first_at_point(const kent_layout *l, const kent_model *m, size_t stop)
{
    return l->stop[l->first[m->route[stop]]] == stop;
}

static kent_node_kind node_kind(kent_seat_kind kind)
{
    switch (kind) {
    case KENT_SEAT_FREE:
    case KENT_SEAT_DEVICE: /* told by kent_node.stand_first instead */
        return KENT_NODE_JUNCTION;
    case KENT_SEAT_LEVEL:
        return KENT_NODE_FIXED_LEVEL;
    case KENT_SEAT_OUTFLOW:
        return KENT_NODE_OUTFLOW;
    case KENT_SEAT_VALVE:
        return KENT_NODE_VALVE;
    }
    return KENT_NODE_JUNCTION;
}

static int add_node(kent_model *m, int point, kent_seat device)
{
    const kent_node_kind kind = node_kind(device.kind);
    m->nodes[m->node_count] =
        (kent_node){.point = point,
                    .kind = kind,
                    .device = kind == KENT_NODE_JUNCTION ? -1 : device.index};
    return (int)m->node_count++;
}

/* Every arm of a point ends at one node. */
static void join_arms(kent_layout *l, int point, int node)
{
    for (size_t i = l->first[point]; i < l->first[point + 1]; i++) {
        l->arm_node[2 * l->stop[i]] = node;
        l->arm_node[2 * l->stop[i] + 1] = node;
    }
}

/* A second node of the point, at which one of its arms ends. */
static int part_arm(kent_model *m, kent_layout *l, int point, kent_arm arm)
{
    const int beyond = add_node(m, point, l->device[point]);
    l->arm_node[kent_arm_number(arm)] = beyond;
    return beyond;
}

static void make_nodes_of_valve(kent_model *m, kent_layout *l, kent_valve *valve,
                                int node)
{
    valve->node[0] = node;
    valve->node[1] = -1;
    if (!isnan(valve->discharge_level)) return;
    kent_arm arms[KENT_ARMS];
    const size_t count = kent_layout_arms(m, l, valve->point, arms);
    assert(count == 2); /* kent_layout_place_devices saw to it */
    (void)count;
    valve->node[1] = part_arm(m, l, valve->point, arms[1]);
}

static void make_nodes_of_device(kent_model *m, kent_layout *l, kent_device *d,
                                 int node)
{
    const bool at_end =
        d->kind == KENT_DEVICE_PUMP && isfinite(m->pumps[d->index].suction_level);
    d->node[0] = at_end ? -1 : node;
    d->node[1] =
        at_end ? node : part_arm(m, l, d->point, kent_device_delivery(m, l, d));
}

static void make_nodes_at(kent_model *m, kent_layout *l, int point)
{
    const kent_seat device = l->device[point];
    const int node = add_node(m, point, device);

    join_arms(l, point, node);
    switch (device.kind) {
    case KENT_SEAT_FREE:
        break;
    case KENT_SEAT_LEVEL:
        m->fixed_levels[device.index].node = node;
        break;
    case KENT_SEAT_OUTFLOW:
        m->outflows[device.index].node = node;
        break;
    case KENT_SEAT_VALVE:
        make_nodes_of_valve(m, l, &m->valves[device.index], node);
        break;
    case KENT_SEAT_DEVICE:
        make_nodes_of_device(m, l, &m->devices[device.index], node);
        break;
    }
}

/* Cuts one pipe's route into its spans. */
static void cut_pipe(kent_model *m, kent_layout *l, int index,
                     kent_complaints *complaints)
{
    const kent_pipe *pipe = &m->pipes[index];
    const size_t end = pipe->route_first + pipe->route_count;
    const size_t before = m->span_count;
    size_t from = pipe->route_first;

    for (size_t stop = from + 1; stop < end; stop++) {
        if (!kent_layout_is_cut(m, l, stop)) continue;
        const int number = (int)m->span_count;
        kent_span *span = &m->spans[m->span_count++];
        *span = (kent_span){
            .pipe = index,
            .node = {l->arm_node[2 * from + 1], l->arm_node[2 * stop]},
            .route_first = from,
            .route_count = stop - from + 1,
        };
        for (size_t s = from; s < stop; s++) {
            l->arm_span[2 * s + 1] = l->arm_span[2 * (s + 1)] = number;
        }
        kent_span_fill(m, span);
        from = stop;
    }
    const size_t parts = m->span_count - before;
    for (size_t i = 0; i < parts; i++) {
        kent_span *span = &m->spans[before + i];
        const int length =
            parts == 1 ? snprintf(span->id, sizeof span->id, "%s", pipe->id)
                       : snprintf(span->id, sizeof span->id, "%s.%zu", pipe->id, i + 1);
        if (length < (int)sizeof span->id) continue;
        kent_place_complain(m, pipe->place, complaints,
                            "pipe \"%s\" is cut into %zu spans and its id is too long "
                            "to number them; use a shorter one",
                            pipe->id, parts);
        return;
    }
}

typedef struct named_span {
    const char *id;
    int pipe;
} named_span;

static int by_id(const void *a, const void *b)
{
    const named_span *x = a;
    const named_span *y = b;
    const int order = strcmp(x->id, y->id);
    return order != 0 ? order : (x->pipe > y->pipe) - (x->pipe < y->pipe);
}

/* A pipe may be called what a span of another one is called. */
static kent_status check_span_ids(const kent_model *m, kent_complaints *complaints)
{
    named_span *named = kent_alloc(m->span_count, sizeof *named);
    if (!named) return KENT_E_NOMEM;
    for (size_t i = 0; i < m->span_count; i++) {
        named[i] = (named_span){m->spans[i].id, m->spans[i].pipe};
    }
    if (m->span_count > 0) qsort(named, m->span_count, sizeof *named, by_id);
    for (size_t i = 1; i < m->span_count; i++) {
        if (strcmp(named[i - 1].id, named[i].id) != 0) continue;
        const kent_pipe *second = &m->pipes[named[i].pipe];
        kent_place_complain(m, second->place, complaints,
                            "pipes \"%s\" and \"%s\" would both have a span called "
                            "\"%s\"; give one of them another id",
                            m->pipes[named[i - 1].pipe].id, second->id, named[i].id);
    }
    free(named);
    return KENT_OK;
}

/* Ends grouped by node, in the order of spans. */
static void group_ends(kent_model *m)
{
    for (size_t i = 0; i < m->span_count; i++) {
        for (int side = 0; side < 2; side++) {
            m->nodes[m->spans[i].node[side]].end_count++;
        }
    }
    size_t next = 0;
    for (size_t n = 0; n < m->node_count; n++) {
        m->nodes[n].end_first = next;
        next += m->nodes[n].end_count;
        m->nodes[n].end_count = 0; /* counted up again while filling */
    }
    for (size_t i = 0; i < m->span_count; i++) {
        for (int side = 0; side < 2; side++) {
            kent_node *node = &m->nodes[m->spans[i].node[side]];
            m->ends[node->end_first + node->end_count++] = (kent_end){(int)i, side};
        }
    }
}

/* Where the free gas of the case slows a wave. */
static void note_gas(kent_model *m)
{
    bool slows = false;

    if (!(m->gas_content > 0.0)) return;
    for (size_t i = 0; i < m->pipe_count; i++) {
        slows = slows || isnan(m->pipes[i].wave_speed);
    }
    if (!slows) return; /* every speed is given */
    kent_notes_add(
        &m->cautions,
        "free gas of %g %% by volume at one atmosphere slows the waves: each "
        "pipe's speed is that at the pressure of still water at its middle, "
        "and stays so while the pressure changes",
        1e2 * m->gas_content);
}

kent_status kent_network_cut(kent_model *m, kent_layout *l, kent_complaints *complaints)
{
    /* At most one span for each stop after a route's first, and two nodes a stop. */
    m->spans = kent_alloc(m->route_count, sizeof *m->spans);
    m->ends = kent_alloc(m->route_count, 2 * sizeof *m->ends);
    m->nodes = kent_alloc(m->route_count, 2 * sizeof *m->nodes);
    if (!m->spans || !m->ends || !m->nodes) return KENT_E_NOMEM;

    for (size_t stop = 0; stop < m->route_count; stop++) {
        if (is_first_at_point(l, m, stop) && kent_layout_is_cut(m, l, stop)) {
            make_nodes_at(m, l, m->route[stop]);
        }
    }
    for (size_t i = 0; i < m->pipe_count; i++) {
        cut_pipe(m, l, (int)i, complaints);
    }
    note_gas(m);
    group_ends(m);
    kent_devices_stand(m, l);
    return check_span_ids(m, complaints);
}

/* The node across a valve that is at least partly open; -1: none. */
static int across_valve(const kent_model *m, size_t node)
{
    if (m->nodes[node].kind != KENT_NODE_VALVE) return -1;
    const kent_valve *valve = &m->valves[m->nodes[node].device];
    if (valve->node[1] < 0 || !(valve->opening > 0.0)) return -1;
    return valve->node[valve->node[0] == (int)node ? 1 : 0];
}

/* Marks and queues a node; returns whether it was new. */
static size_t visit(int node, int part, int *part_of, int *queue, size_t count)
{
    if (node < 0 || part_of[node] >= 0) return count;
    part_of[node] = part;
    queue[count] = node;
    return count + 1;
}

/* Gives every node reached from start the number `part`, listing them in queue; returns
 * how many there are. */
static size_t reach(const kent_model *m, int start, int part, int *part_of, int *queue)
{
    size_t count = 0;
    queue[count++] = start;
    part_of[start] = part;
    for (size_t head = 0; head < count; head++) {
        const kent_node *node = &m->nodes[queue[head]];
        for (size_t e = 0; e < node->end_count; e++) {
            const kent_end end = m->ends[node->end_first + e];
            count = visit(m->spans[end.span].node[1 - end.side], part, part_of, queue,
                          count);
        }
        for (size_t k = 0; k < node->stand_count; k++) {
            const kent_device *d = &m->devices[m->stands[node->stand_first + k]];
            count = visit(d->node[0], part, part_of, queue, count);
            count = visit(d->node[1], part, part_of, queue, count);
        }
        count =
            visit(across_valve(m, (size_t)queue[head]), part, part_of, queue, count);
    }
    return count;
}

/* Whether a pump there has a suction level, which ties the heads beyond it. */
static bool draws_from_a_level(const kent_model *m, const kent_node *node)
{
    for (size_t k = 0; k < node->stand_count; k++) {
        const kent_device *d = &m->devices[m->stands[node->stand_first + k]];
        if (d->kind == KENT_DEVICE_PUMP && d->node[0] < 0) return true;
    }
    return false;
}

static void complain_cut_off(const kent_model *m, const int *nodes, size_t count,
                             kent_complaints *complaints)
{
    char named[NAMED_POINTS * (KENT_ID + 4)] = "";
    size_t used = 0;
    for (size_t i = 0; i < count && i < NAMED_POINTS; i++) {
        const int n =
            snprintf(named + used, sizeof named - used, "%s\"%s\"", i == 0 ? "" : ", ",
                     m->points[m->nodes[nodes[i]].point].id);
        used += (size_t)n; /* fits: NAMED_POINTS ids and their separators do */
    }
    const kent_end end = m->ends[m->nodes[nodes[0]].end_first];
    const kent_pipe *pipe = &m->pipes[m->spans[end.span].pipe];
    kent_place_complain(m, pipe->place, complaints,
                        "pipe \"%s\": no fixed level reaches %zu point%s: %s%s; add a "
                        "fixed level there, or open the valve that cuts them off",
                        pipe->id, count, count == 1 ? "" : "s", named,
                        count > NAMED_POINTS ? " ..." : "");
}

kent_status kent_network_check_connected(const kent_model *m,
                                         kent_complaints *complaints)
{
    kent_status status = KENT_E_NOMEM;
    int *part_of = NULL, *queue = NULL;

    if (m->span_count == 0) return KENT_OK;
    if (m->fixed_level_count == 0) {
        kent_place_complain(m, m->pipes[0].place, complaints,
                            "no fixed level: heads are not determined; add one to "
                            "fixed_levels, such as the service reservoir's");
        return KENT_OK;
    }
    part_of = kent_alloc(m->node_count, sizeof *part_of);
    queue = kent_alloc(m->node_count, sizeof *queue);
    if (!part_of || !queue) goto done;

    for (size_t n = 0; n < m->node_count; n++) {
        part_of[n] = -1;
    }
    for (size_t n = 0; n < m->node_count; n++) {
        if (part_of[n] >= 0) continue;
        const size_t count = reach(m, (int)n, (int)n, part_of, queue);
        bool has_level = false;
        for (size_t i = 0; i < count; i++) {
            has_level |= m->nodes[queue[i]].kind == KENT_NODE_FIXED_LEVEL ||
                         draws_from_a_level(m, &m->nodes[queue[i]]);
        }
        if (!has_level) complain_cut_off(m, queue, count, complaints);
    }
    status = KENT_OK;
done:
    free(part_of);
    free(queue);
    return status;
}
