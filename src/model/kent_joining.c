#include "kent_joining.h"

#include <assert.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

kent_status kent_joining_start(kent_joining *j, kent_model *m, const kent_layout *l)
{
    *j = (kent_joining){.m = m, .l = l};
    j->fitting_at = kent_alloc(m->point_count, sizeof *j->fitting_at);
    j->root = kent_alloc(m->fitting_count, sizeof *j->root);
    j->linked = kent_alloc(m->fitting_count, sizeof *j->linked);
    j->next = kent_alloc(m->fitting_count, sizeof *j->next);
    j->inner = kent_alloc(m->port_count, sizeof *j->inner);
    if (!j->fitting_at || !j->root || !j->linked || !j->next || !j->inner) {
        return KENT_E_NOMEM;
    }
    for (size_t p = 0; p < m->point_count; p++) {
        j->fitting_at[p] = -1;
    }
    for (size_t f = 0; f < m->fitting_count; f++) {
        const kent_fitting *fitting = &m->fittings[f];
        if (fitting->point >= 0) j->fitting_at[fitting->point] = (int)f;
        for (size_t k = 0; k < fitting->member_count; k++) {
            j->fitting_at[m->members[fitting->member_first + k]] = (int)f;
        }
        j->root[f] = j->linked[f] = (int)f;
        j->next[f] = -1;
    }
    return KENT_OK;
}

void kent_joining_clear(kent_joining *j)
{
    free(j->fitting_at);
    free(j->root);
    free(j->linked);
    free(j->next);
    free(j->inner);
    *j = (kent_joining){0};
}

/* ---- ways ------------------------------------------------------------------------ */

/* The arm that a port of a fitting was made from. */
static bool arm_of(const kent_joining *j, int point, const kent_port *port,
                   kent_arm *out)
{
    kent_arm arms[KENT_ARMS];
    const size_t count = kent_layout_arms(j->m, j->l, point, arms);
    for (size_t i = 0; i < count && i < KENT_ARMS; i++) {
        if (j->l->arm_span[kent_arm_number(arms[i])] != port->span) continue;
        if (arms[i].leaves != (port->sign > 0.0)) continue;
        *out = arms[i];
        return true;
    }
    return false;
}

/* The port of a fitting made from an arm; it is one of the model's. */
static size_t port_of_arm(const kent_joining *j, int fitting, kent_arm arm)
{
    const kent_fitting *f = &j->m->fittings[fitting];
    for (size_t k = f->port_first; k < f->port_first + f->port_count; k++) {
        const kent_port *port = &j->m->ports[k];
        if (port->span == j->l->arm_span[kent_arm_number(arm)] &&
            arm.leaves == (port->sign > 0.0)) {
            return k;
        }
    }
    assert(!"every arm of a fitting has its port");
    return f->port_first;
}

/* Where a pipe goes on past a point without a fitting: the other one of just two arms,
 * and no tank or pump between. */
static bool go_on(const kent_joining *j, int point, kent_arm came, kent_arm *out)
{
    kent_arm arms[KENT_ARMS];
    const kent_seat_kind seat = j->l->device[point].kind;
    if (seat == KENT_SEAT_LEVEL || seat == KENT_SEAT_DEVICE) return false;
    if (kent_layout_arms(j->m, j->l, point, arms) != 2) return false;
    const bool first = arms[0].stop == came.stop && arms[0].leaves == came.leaves;
    *out = arms[first ? 1 : 0];
    return true;
}

bool kent_joining_way(const kent_joining *j, int fitting, size_t port, double diameters,
                      double length, kent_way *out)
{
    const kent_model *m = j->m;
    kent_arm arm;
    double outside = 0.0;

    *out = (kent_way){.fitting = -1};
    if (m->ports[port].kind != KENT_PORT_SPAN) return false;
    if (!arm_of(j, m->fittings[fitting].point, &m->ports[port], &arm)) return false;
    for (size_t legs = 0; legs < m->route_count; legs++) {
        const size_t stop = arm.leaves ? arm.stop + 1 : arm.stop - 1;
        const kent_pipe *pipe = &m->pipes[j->l->pipe[stop]];
        const kent_arm back = {stop, !arm.leaves};
        outside =
            fmax(outside, isfinite(pipe->outside_diameter) ? pipe->outside_diameter
                                                           : pipe->inside_diameter);
        out->distance += fabs(m->chainage[stop] - m->chainage[arm.stop]);
        out->slips |= kent_joint_slips(pipe->joint);
        const bool far = out->distance >= diameters * outside || out->distance > length;
        if (far) return false;
        out->fitting = j->fitting_at[m->route[stop]];
        if (out->fitting >= 0) {
            out->port = port_of_arm(j, out->fitting, back);
            return true;
        }
        if (!go_on(j, m->route[stop], back, &arm)) return false;
    }
    return false; /* a ring without a fitting but this one, or with none */
}

/* ---- becoming one ---------------------------------------------------------------- */

static int root_in(int *root, int f)
{
    while (root[f] != f) {
        root[f] = root[root[f]];
        f = root[f];
    }
    return f;
}

static void unite_in(int *root, int a, int b)
{
    const int x = root_in(root, a), y = root_in(root, b);
    root[x < y ? y : x] = x < y ? x : y;
}

int kent_joining_root(const kent_joining *j, int f) { return root_in(j->root, f); }

void kent_joining_unite(kent_joining *j, int a, int b) { unite_in(j->root, a, b); }

int kent_joining_link(const kent_joining *j, int f) { return root_in(j->linked, f); }

void kent_joining_inner(kent_joining *j, int f, size_t port, const kent_way *way)
{
    j->inner[port] = j->inner[way->port] = true;
    unite_in(j->linked, f, way->fitting);
}

/* Members strung together in the order of the list; returns how many joined another. */
static size_t string_members(kent_joining *j, int *last)
{
    size_t joined = 0;
    for (size_t f = 0; f < j->m->fitting_count; f++) {
        const int root = kent_joining_root(j, (int)f);
        j->root[f] = root;
        if (root != (int)f) {
            j->next[last[root]] = (int)f;
            joined++;
        }
        last[root] = (int)f;
    }
    return joined;
}

/* The fitting at root, with its members listed, its ports at the list's end. */
static bool keep_joined(kent_joining *j, int root, kent_fitting *kept, kent_port *ports,
                        size_t *port_count, kent_merge *merge,
                        kent_complaints *complaints)
{
    kent_model *m = j->m;
    const size_t first = m->member_count;
    for (int f = root; f >= 0; f = j->next[f]) {
        m->members[m->member_count++] = m->fittings[f].point;
    }
    if (!merge(j, root, kept, ports + *port_count, complaints)) return false;
    kept->member_first = first;
    kept->member_count = m->member_count - first;
    kept->port_first = *port_count;
    *port_count += kept->port_count;
    return true;
}

static void keep_alone(const kent_model *m, const kent_fitting *f, kent_fitting *kept,
                       kent_port *ports, size_t *port_count)
{
    *kept = *f;
    kept->port_first = *port_count;
    memcpy(ports + *port_count, m->ports + f->port_first,
           f->port_count * sizeof *ports);
    *port_count += f->port_count;
}

kent_status kent_joining_finish(kent_joining *j, kent_merge *merge,
                                kent_complaints *complaints)
{
    kent_model *m = j->m;
    kent_status status = KENT_E_NOMEM;
    size_t fitting_count = 0, port_count = 0, capacity = m->member_count;
    kent_fitting *fittings = NULL;
    kent_port *ports = NULL;
    void *members = m->members;
    int *last = kent_alloc(m->fitting_count, sizeof *last);

    if (!last) goto done;
    const size_t joined = string_members(j, last);
    status = KENT_OK;
    if (joined == 0) goto done;
    status = KENT_E_NOMEM;
    if (kent_grow(&members, &capacity, m->member_count + 2 * joined,
                  sizeof *m->members) != 0) {
        goto done;
    }
    m->members = members;
    fittings = kent_alloc(m->fitting_count, sizeof *fittings);
    ports = kent_alloc(m->port_count + KENT_ARMS, sizeof *ports);
    if (!fittings || !ports) goto done;
    for (size_t f = 0; f < m->fitting_count; f++) {
        if (j->root[f] != (int)f) continue;
        kent_fitting *kept = &fittings[fitting_count];
        if (j->next[f] < 0) {
            keep_alone(m, &m->fittings[f], kept, ports, &port_count);
        } else if (!keep_joined(j, (int)f, kept, ports, &port_count, merge,
                                complaints)) {
            continue; /* complained of */
        }
        fitting_count++;
    }
    free(m->fittings);
    free(m->ports);
    m->fittings = fittings;
    m->fitting_count = fitting_count;
    m->ports = ports;
    m->port_count = port_count;
    fittings = NULL;
    ports = NULL;
    status = KENT_OK;
done:
    free(last);
    free(fittings);
    free(ports);
    return status;
}
