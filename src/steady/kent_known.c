#include "kent_known_internal.h"
#include "kent_duty_internal.h"
#include "kent_outlet_internal.h"
#include "kent_parts.h"

#include <math.h>
#include <stdlib.h>

/* A link that had to shut again after it was opened this often stays shut. */
enum { TRIES = 4 };

static bool passes_on_head(const kent_link *link)
{
    return link->law == KENT_LINK_LOSS || link->law == KENT_LINK_PUMP;
}

static void find_parts(const kent_equations *eq, int *part)
{
    for (size_t n = 0; n < eq->nodes; n++) {
        part[n] = (int)n;
    }
    for (size_t e = 0; e < eq->spans; e++) {
        const int *node = eq->model->spans[e].node;
        kent_parts_join(part, node[0], node[1]);
    }
    for (size_t i = 0; i < eq->links; i++) {
        const int *node = eq->link[i].node;
        if (node[0] < 0 || node[1] < 0 || !passes_on_head(&eq->link[i])) continue;
        kent_parts_join(part, node[0], node[1]);
    }
    for (size_t n = 0; n < eq->nodes; n++) {
        part[n] = kent_parts_root(part, (int)n);
    }
}

/* Marks the parts whose heads something fixes: a fixed level, or what leads outside the
 * main and passes what it will. outflows: whether those that go by pressure count; they
 * may yet come to draw all or nothing. */
static void mark_known(const kent_equations *eq, bool outflows, const int *part,
                       bool *known)
{
    for (size_t n = 0; n < eq->nodes; n++) {
        known[n] = false;
    }
    for (size_t n = 0; n < eq->nodes; n++) {
        if (eq->fixed_level[n] >= 0) known[part[n]] = true;
    }
    for (size_t i = 0; i < eq->links; i++) {
        const kent_link *link = &eq->link[i];
        const bool outflow = i >= eq->first_outflow && i < eq->first_device;
        if (link->law == KENT_LINK_FLOW || (outflow && !outflows)) continue;
        if (link->node[0] < 0) known[part[link->node[1]]] = true;
        if (link->node[1] < 0) known[part[link->node[0]]] = true;
    }
}

/* A valve that holds a head fixes it where what it then passes has somewhere to go, or
 * to come from, on its other side. */
static void mark_held(const kent_equations *eq, const int *part, bool *known)
{
    bool more = true;
    while (more) {
        more = false;
        for (size_t i = eq->first_device; i < eq->first_standing; i++) {
            const kent_link *link = &eq->link[i];
            if (link->law != KENT_LINK_HEAD) continue;
            bool *held = &known[part[link->node[link->held]]];
            if (*held || !known[part[link->node[1 - link->held]]]) continue;
            *held = more = true;
        }
    }
}

/* Whether a valve holds a head in that part, without being of use there yet. */
static bool is_held(const kent_equations *eq, const int *part, int of)
{
    for (size_t i = eq->first_device; i < eq->first_standing; i++) {
        const kent_link *link = &eq->link[i];
        if (link->law != KENT_LINK_HEAD) continue;
        if (part[link->node[link->held]] == of) return true;
    }
    return false;
}

/* ---- why a head is not known ----------------------------------------------------- */

static bool leads_to(const kent_link *link, const int *part, int to)
{
    return (link->node[0] >= 0 && part[link->node[0]] == to) ||
           (link->node[1] >= 0 && part[link->node[1]] == to);
}

static const char *node_name(const kent_model *m, size_t node)
{
    return m->points[m->nodes[node].point].id;
}

static kent_status tell_valve(const kent_equations *eq, const kent_valve *v, size_t n,
                              kent_error *err)
{
    const bool by_flow = isnan(v->capacity);
    char where[160];
    kent_model_place_text(eq->model, v->place, where, sizeof where);
    return kent_error_set(
        err, KENT_E_INPUT, where,
        "nothing fixes the head at point %s: only valve %s leads there, and it %s; "
        "%s",
        node_name(eq->model, n), v->id, by_flow ? "is given by its flow" : "is closed",
        by_flow ? "give its loss, kv or cv instead, or a fixed level there"
                : "open it, or give a fixed level there");
}

static kent_status tell_device(const kent_equations *eq, size_t device, const int *part,
                               size_t n, kent_error *err)
{
    const kent_model *m = eq->model;
    const kent_device *d = &m->devices[device];
    const bool stands = d->kind == KENT_DEVICE_PUMP && !kent_duty_is_shut(eq, device);
    const kent_link *link = &eq->link[eq->first_device + device];
    const char *why = "lets nothing back, so that what flows in has no way out";
    const char *better = "let no more into the main there than leaves it, or give a "
                         "fixed level there";
    const bool feeds = link->node[1] >= 0 && part[link->node[1]] == part[n];
    char where[160];

    if (stands) {
        why = "stands still";
        better = "let it run, or give a fixed level there";
    } else if (link->law == KENT_LINK_HEAD) {
        why = "holds the head on its other side only";
        better = "give a fixed level there, or outflows that depend on pressure";
    } else if (!feeds) {
        why = "lets nothing in, so that nothing can be drawn";
        better = "turn it round, or give a fixed level there";
    }
    kent_model_place_text(m, kent_device_place(m, d), where, sizeof where);
    return kent_error_set(err, KENT_E_INPUT, where,
                          "nothing fixes the head at point %s: only %s %s leads there, "
                          "and it %s; %s",
                          node_name(m, n), kent_device_word(d->kind), d->id, why,
                          better);
}

/* The first valve or device at the part of n that does not pass on a head. */
static kent_status tell_unknown(const kent_equations *eq, const int *part, size_t n,
                                kent_error *err)
{
    const kent_model *m = eq->model;
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_link *link = &eq->link[i];
        if (passes_on_head(link) || !leads_to(link, part, part[n])) continue;
        return tell_valve(eq, &m->valves[i], n, err);
    }
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_link *link = &eq->link[eq->first_device + i];
        const bool in_line = m->devices[i].node[1] >= 0;
        if (!in_line || passes_on_head(link)) continue;
        if (!leads_to(link, part, part[n])) continue;
        return tell_device(eq, i, part, n, err);
    }
    /* unreached: a part without a fixed level is refused when the model is derived */
    return kent_error_set(err, KENT_E_INPUT, "",
                          "nothing fixes the head at point %s; connect it to a fixed "
                          "level",
                          node_name(m, n));
}

/* ---- what may fix it ------------------------------------------------------------- */

/* Opens the first shut device with its side at that part. */
static bool open_device(kent_equations *eq, const int *part, int to, int side,
                        unsigned char *opened)
{
    for (size_t i = 0; i < eq->model->device_count; i++) {
        const size_t l = eq->first_device + i;
        const int node = eq->link[l].node[side];
        if (node < 0 || part[node] != to || opened[l] >= TRIES) continue;
        if (!kent_duty_is_shut(eq, i)) continue;
        kent_duty_open(eq, i);
        opened[l]++;
        return true;
    }
    return false;
}

static bool loosen_outflow(kent_equations *eq, const int *part, int to,
                           unsigned char *opened)
{
    for (size_t i = 0; i < eq->model->outflow_count; i++) {
        const size_t l = eq->first_outflow + i;
        if (part[eq->link[l].node[0]] != to || opened[l] >= TRIES) continue;
        if (!kent_outlet_loosen(eq, i)) continue;
        opened[l]++;
        return true;
    }
    return false;
}

/* Whether something changed so that the part may have a head now, or has outflows that
 * go by pressure. */
static bool restore_part(kent_equations *eq, const int *part, int to,
                         unsigned char *opened)
{
    return open_device(eq, part, to, 1, opened) ||
           loosen_outflow(eq, part, to, opened) || open_device(eq, part, to, 0, opened);
}

/* A node whose head nothing fixes, with all parts in part; eq->nodes: none. One in a
 * part where a valve holds a head comes last: what is behind the valve may be all that
 * it wants. */
static size_t find_unknown(const kent_equations *eq, bool outflows, int *part,
                           bool *known)
{
    size_t found = eq->nodes;
    find_parts(eq, part);
    mark_known(eq, outflows, part, known);
    mark_held(eq, part, known);
    for (size_t n = 0; n < eq->nodes; n++) {
        if (known[part[n]]) continue;
        found = n;
        if (!is_held(eq, part, part[n])) break;
    }
    return found;
}

/* restored: eq again, or NULL: only looks. */
static kent_status see_to_heads(kent_equations *restored, const kent_equations *eq,
                                unsigned char *opened, kent_error *err)
{
    kent_status status = KENT_OK;
    int *part = kent_alloc(eq->nodes, sizeof *part);
    bool *known = kent_alloc(eq->nodes, sizeof *known);

    if (!part || !known) {
        status = kent_error_nomem(err);
        goto done;
    }
    for (;;) {
        const size_t n = find_unknown(eq, restored != NULL, part, known);
        if (n == eq->nodes) break;
        if (restored && restore_part(restored, part, part[n], opened)) continue;
        status = tell_unknown(eq, part, n, err);
        break;
    }
done:
    free(part);
    free(known);
    return status;
}

kent_status kent_known_check(const kent_equations *eq, kent_error *err)
{
    return see_to_heads(NULL, eq, NULL, err);
}

kent_status kent_known_restore(kent_equations *eq, unsigned char *opened,
                               kent_error *err)
{
    return see_to_heads(eq, eq, opened, err);
}
