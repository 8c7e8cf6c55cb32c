/* Legs of a branching fitting that can be shut, one at a time. */
#include "kent_parts.h"
#include "kent_recorder_internal.h"

#include <stdlib.h>

static const kent_stated *stated_at(const kent_model *m, const kent_fitting *f,
                                    int point)
{
    if (f->type != KENT_GROUP) return &f->stated;
    for (size_t i = 0; i < m->note_count; i++) {
        if (m->notes[i].point == point) return &m->notes[i].stated;
    }
    return NULL;
}

/* How many pipes leave a point, either way. */
static size_t arms_at(const kent_model *m, int point)
{
    size_t arms = 0;

    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *p = &m->pipes[i];
        for (size_t k = 0; k < p->route_count; k++) {
            if (m->route[p->route_first + k] != point) continue;
            arms += k > 0 && k + 1 < p->route_count ? 2 : 1;
        }
    }
    return arms;
}

/* Where three pipes or more meet at a cross or wye, nothing is balanced by its shape
 * alone; a run with a dead branch has no valves of its own. Of a group each cross in
 * it. */
static bool shuts_unasked(const kent_model *m, const kent_fitting *f, int point)
{
    size_t pipes = 0;

    for (size_t k = f->port_first; k < f->port_first + f->port_count; k++) {
        pipes += m->ports[k].kind == KENT_PORT_SPAN;
    }
    switch (f->type) {
    case KENT_CROSS:
    case KENT_WYE:
        return pipes >= 3;
    case KENT_GROUP:
        return arms_at(m, point) > 3;
    case KENT_BEND:
    case KENT_TEE:
    case KENT_REDUCER:
    case KENT_DEAD_END:
    case KENT_VALVE:
    case KENT_STRAIGHT:
    case KENT_CURVE:
        break;
    }
    return false;
}

bool kent_port_shuts(const kent_model *m, const kent_fitting *f, size_t port)
{
    const kent_port *p = &m->ports[f->port_first + port];
    const bool branches = f->type == KENT_CROSS || f->type == KENT_WYE ||
                          f->type == KENT_TEE || f->type == KENT_GROUP;

    if (!branches || p->kind != KENT_PORT_SPAN || f->port_count < 2) return false;
    const int point = kent_port_point(m, f, p);
    const kent_stated *s = stated_at(m, f, point);
    if (!s || !s->closes_stated) return shuts_unasked(m, f, point);
    for (size_t i = 0; i < s->closes_count; i++) {
        if (m->closes[s->closes_first + i] == p->toward) return true;
    }
    return false;
}

bool kent_fitting_has_shut_legs(const kent_model *m, const kent_fitting *f)
{
    for (size_t i = 0; i < f->port_count; i++) {
        if (kent_port_shuts(m, f, i)) return true;
    }
    return false;
}

/* ---- what is behind a leg -------------------------------------------------------- */

/* The far end of the pipe that a port leads into. */
static int node_beyond(const kent_model *m, const kent_port *p)
{
    return m->spans[p->span].node[p->sign > 0.0 ? 1 : 0];
}

static bool is_own(const kent_model *m, const kent_fitting *f, size_t span)
{
    for (size_t k = f->port_first; k < f->port_first + f->port_count; k++) {
        if (m->ports[k].span == (int)span) return true;
    }
    return false;
}

static void join(int *part, const int node[2])
{
    if (node[0] >= 0 && node[1] >= 0) kent_parts_join(part, node[0], node[1]);
}

/* Nodes that water passes between without passing the fitting, every valve open. */
static void parts_without(const kent_model *m, const kent_fitting *f, int *part)
{
    for (size_t n = 0; n < m->node_count; n++) {
        part[n] = (int)n;
    }
    for (size_t i = 0; i < m->span_count; i++) {
        if (!is_own(m, f, i)) join(part, m->spans[i].node);
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        join(part, m->valves[i].node);
    }
    for (size_t i = 0; i < m->device_count; i++) {
        if (kent_device_in_line(m->devices[i].kind)) join(part, m->devices[i].node);
    }
}

/* The node that a device puts under pressure by itself; -1: none. */
static int pressed_by(const kent_device *d)
{
    switch (d->kind) {
    case KENT_DEVICE_PUMP:
        return d->node[1];
    case KENT_DEVICE_SURGE_TANK:
    case KENT_DEVICE_ONE_WAY_TANK:
    case KENT_DEVICE_AIR_VESSEL:
        return d->node[0];
    case KENT_DEVICE_CHECK_VALVE:
    case KENT_DEVICE_CONTROL_VALVE:
    case KENT_DEVICE_RELIEF_VALVE:
    case KENT_DEVICE_AIR_VALVE:
    case KENT_DEVICE_BURST:
    case KENT_DEVICE_KINDS:
        break;
    }
    return -1;
}

static bool part_supplied(const kent_model *m, int *part, int node)
{
    const int root = kent_parts_root(part, node);

    for (size_t n = 0; n < m->node_count; n++) {
        const bool fixed = m->nodes[n].kind == KENT_NODE_FIXED_LEVEL;
        if (fixed && kent_parts_root(part, (int)n) == root) return true;
    }
    for (size_t i = 0; i < m->device_count; i++) {
        const int at = pressed_by(&m->devices[i]);
        if (at >= 0 && kent_parts_root(part, at) == root) return true;
    }
    return false;
}

int kent_ports_supplied(const kent_model *m, const kent_fitting *f,
                        bool supplied[KENT_PORTS])
{
    int *part = kent_alloc(m->node_count, sizeof *part);

    if (!part) return -1;
    parts_without(m, f, part);
    for (size_t i = 0; i < f->port_count; i++) {
        const kent_port *p = &m->ports[f->port_first + i];
        supplied[i] =
            p->kind == KENT_PORT_SPAN && part_supplied(m, part, node_beyond(m, p));
    }
    free(part);
    return 0;
}
