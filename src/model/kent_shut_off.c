/* Where pumps could raise still water to: kent_model.shut_off_level. */
#include "kent_model_internal.h"
#include "kent_parts.h"

#include <math.h>
#include <stdlib.h>

/* What is found, part by part: nodes that pipes, valves and control valves join without
 * a fixed level between them, which holds. */
typedef struct reach {
    const kent_model *m;
    int *part;     /* [node_count] */
    double *level; /* [node_count] m, by part; NAN: no pump reaches it */
} reach;

static bool holds(const kent_model *m, int node)
{
    return m->nodes[node].kind == KENT_NODE_FIXED_LEVEL;
}

static void join(const reach *r, const int node[2])
{
    if (node[0] < 0 || node[1] < 0 || holds(r->m, node[0]) || holds(r->m, node[1])) {
        return;
    }
    kent_parts_join(r->part, node[0], node[1]);
}

static void find_parts(const reach *r)
{
    const kent_model *m = r->m;
    for (size_t n = 0; n < m->node_count; n++) {
        r->part[n] = (int)n;
    }
    for (size_t i = 0; i < m->span_count; i++) {
        join(r, m->spans[i].node);
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        join(r, m->valves[i].node);
    }
    for (size_t i = 0; i < m->control_valve_count; i++) {
        join(r, m->control_valves[i].node);
    }
    for (size_t n = 0; n < m->node_count; n++) {
        r->part[n] = kent_parts_root(r->part, (int)n);
    }
}

static double level_at(const reach *r, int node) { return r->level[r->part[node]]; }

/* Returns whether it rose. */
static bool raise(const reach *r, int node, double to)
{
    double *level = &r->level[r->part[node]];
    if (holds(r->m, node) || isnan(to) || to <= *level) return false;
    *level = to;
    return true;
}

/* m: what a pump raises the water behind it to. */
static double raised_by(const reach *r, const kent_pump *p)
{
    const double from =
        p->node[0] < 0 ? p->suction_level /* fmax passes over NAN */
                       : fmax(r->m->highest_level[p->node[0]], level_at(r, p->node[0]));
    return from + p->curve.head[0];
}

/* Whether the level behind a pump may come to stand before it too: without a check
 * valve, but it keeps what it raised itself. */
static bool lets_back(const reach *r, const kent_pump *p)
{
    return p->check_valve == KENT_CHECK_NONE &&
           level_at(r, p->node[1]) > raised_by(r, p);
}

/* Through pumps at rest and check valves, that let water through one way. */
static void spread(const reach *r)
{
    const kent_model *m = r->m;
    bool more = true;
    while (more) {
        more = false;
        for (size_t i = 0; i < m->check_valve_count; i++) {
            const int *node = m->check_valves[i].node;
            more = raise(r, node[1], level_at(r, node[0])) || more;
        }
        for (size_t i = 0; i < m->pump_count; i++) {
            const kent_pump *p = &m->pumps[i];
            if (p->node[0] < 0 || !lets_back(r, p)) continue;
            more = raise(r, p->node[0], level_at(r, p->node[1])) || more;
        }
    }
}

/* m: every pump once, one after another, on the highest level: where pumps feed each
 * other in a ring they raise the water no further. */
static double most_of(const kent_model *m)
{
    double start = -INFINITY, lifts = 0.0;
    for (size_t n = 0; n < m->node_count; n++) {
        start = fmax(start, m->highest_level[n]);
    }
    for (size_t i = 0; i < m->pump_count; i++) {
        lifts += m->pumps[i].curve.head[0];
    }
    return start + lifts;
}

static void find_levels(const reach *r)
{
    const kent_model *m = r->m;
    const double most = most_of(m);
    for (size_t n = 0; n < m->node_count; n++) {
        r->level[n] = (double)NAN;
    }
    for (size_t round = 0; round < m->pump_count; round++) { /* pumps after pumps */
        bool more = false;
        for (size_t i = 0; i < m->pump_count; i++) {
            const kent_pump *p = &m->pumps[i];
            more = raise(r, p->node[1], fmin(raised_by(r, p), most)) || more;
        }
        if (!more) return;
        spread(r);
    }
}

kent_status kent_shut_off_levels(kent_model *m)
{
    reach r = {.m = m,
               .part = kent_alloc(m->node_count, sizeof *r.part),
               .level = kent_alloc(m->node_count, sizeof *r.level)};
    m->shut_off_level = kent_alloc(m->node_count, sizeof *m->shut_off_level);
    const bool room = r.part && r.level && m->shut_off_level;
    if (room) {
        find_parts(&r);
        find_levels(&r);
    }
    for (size_t n = 0; room && n < m->node_count; n++) {
        m->shut_off_level[n] = level_at(&r, (int)n);
    }
    free(r.part);
    free(r.level);
    return room ? KENT_OK : KENT_E_NOMEM;
}

double kent_shut_off_level(const kent_model *m, int span)
{
    const int *node = m->spans[span].node;
    return fmax(m->shut_off_level[node[0]], m->shut_off_level[node[1]]);
}
