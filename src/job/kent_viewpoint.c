#include "kent_viewpoint.h"

#include <stdlib.h>
#include <string.h>

/* Where and by what each point is looked at. */
typedef struct looks {
    kent_watch *place; /* [point_count] the first, in order of spans and then along the
                          route, where the point is met; span -1: on no pipe */
    int *valve;        /* [point_count] that stands there; -1: none */
    int *device;       /* [point_count] the first that stands there, bursts apart, whose
                          pipe is whole in other scenarios; -1: none */
    bool *wanted;      /* [point_count] its history is kept */
} looks;

static void find_places(const kent_model *m, const looks *l)
{
    for (size_t p = 0; p < m->point_count; p++) {
        l->place[p].span = l->valve[p] = l->device[p] = -1;
    }
    for (size_t i = 0; i < m->span_count; i++) {
        const size_t first = m->spans[i].route_first;
        for (size_t r = first; r < first + m->spans[i].route_count; r++) {
            kent_watch *place = &l->place[m->route[r]];
            if (place->span >= 0) continue;
            *place = (kent_watch){(int)i, m->chainage[r] - m->chainage[first]};
        }
    }
    for (size_t i = m->valve_count; i > 0; i--) {
        l->valve[m->valves[i - 1].point] = (int)i - 1; /* the first stays */
    }
    for (size_t i = m->device_count; i > 0; i--) {
        if (m->devices[i - 1].kind == KENT_DEVICE_BURST) continue;
        l->device[m->devices[i - 1].point] = (int)i - 1;
    }
}

/* The end of the first span at a node. */
static kent_watch place_of_node(const kent_model *m, int node)
{
    const kent_end end = m->ends[m->nodes[node].end_first];
    const double length = m->spans[end.span].length;
    return (kent_watch){end.span, end.side == 0 ? 0.0 : length};
}

/* Marks the points whose history is wanted. */
static void mark_histories(const kent_model *m, bool *wanted)
{
    for (size_t i = 0; i < m->point_count; i++) {
        wanted[i] = m->points[i].record;
    }
    for (size_t i = 0; i < m->fitting_count; i++) {
        if (m->fittings[i].point >= 0) wanted[m->fittings[i].point] = true;
    }
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        wanted[m->fixed_levels[i].point] = true;
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        wanted[m->outflows[i].point] = true;
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        wanted[m->valves[i].point] = true;
    }
    for (size_t i = 0; i < m->device_count; i++) {
        wanted[m->devices[i].point] = true;
    }
}

/* A valve's own flow is positive from its first node: into the valve at a span's end.
 */
static double sign_at_valve(const kent_model *m, int valve)
{
    return m->ends[m->nodes[m->valves[valve].node[0]].end_first].side == 1 ? 1.0 : -1.0;
}

static void add_view(kent_viewpoints *v, kent_viewpoint view, kent_watch watch,
                     bool history)
{
    v->watches[v->recorder_count + v->count] = watch;
    v->views[v->count] = view;
    if (history && v->history_count < KENT_HISTORY_PLACES) {
        v->history[v->history_count++] = (int)v->count;
    } else if (history) {
        v->history_cut = true;
    }
    v->count++;
}

/* The nodes of what stands in line at a point, or of a valve that discharges there. */
static const int *nodes_in_line(const kent_model *m, const looks *l, int point)
{
    if (l->valve[point] >= 0) return m->valves[l->valve[point]].node;
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        if (d->point == point && d->node[0] >= 0 && d->node[1] >= 0) return d->node;
    }
    return NULL;
}

/* Flow through a device, where one stands there: a valve's before all others'. */
static void add_point(kent_viewpoints *v, const kent_model *m, const looks *l,
                      int point)
{
    const int valve = l->valve[point], device = valve < 0 ? l->device[point] : -1;
    const bool history = l->wanted[point];
    const int *node = nodes_in_line(m, l, point);
    if (!node) {
        if (l->place[point].span < 0) return; /* on no pipe */
        add_view(v, (kent_viewpoint){point, 1.0, false, device}, l->place[point],
                 history);
        return;
    }
    const double sign = valve < 0 ? 1.0 : sign_at_valve(m, valve);
    add_view(v, (kent_viewpoint){point, sign, false, device}, place_of_node(m, node[0]),
             history);
    if (node[1] < 0) return;
    add_view(v, (kent_viewpoint){point, 1.0, true, -1}, place_of_node(m, node[1]),
             false);
}

kent_status kent_viewpoints_new(const kent_model *m, const kent_recorder *recorder,
                                kent_viewpoints **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    size_t recorder_count = 0;
    const kent_watch *own = kent_recorder_watches(recorder, &recorder_count);
    const size_t most = 2 * m->point_count;
    const looks l = {
        .place = kent_alloc(m->point_count, sizeof *l.place),
        .valve = kent_alloc(m->point_count, sizeof *l.valve),
        .device = kent_alloc(m->point_count, sizeof *l.device),
        .wanted = kent_alloc(m->point_count, sizeof *l.wanted),
    };
    kent_viewpoints *v = kent_alloc(1, sizeof *v);
    if (!l.place || !l.valve || !l.device || !l.wanted || !v) goto done;

    v->watches = kent_alloc(recorder_count + most, sizeof *v->watches);
    v->views = kent_alloc(most, sizeof *v->views);
    v->history = kent_alloc(most, sizeof *v->history);
    if (!v->watches || !v->views || !v->history) goto done;

    v->recorder_count = recorder_count;
    if (recorder_count) memcpy(v->watches, own, recorder_count * sizeof *own);
    find_places(m, &l);
    mark_histories(m, l.wanted);
    for (size_t i = 0; i < m->point_count; i++) {
        add_point(v, m, &l, (int)i);
    }
    *out = v;
    v = NULL;
    status = KENT_OK;
done:
    if (status) (void)kent_error_nomem(err);
    kent_viewpoints_free(v);
    free(l.place);
    free(l.valve);
    free(l.device);
    free(l.wanted);
    return status;
}

void kent_viewpoints_free(kent_viewpoints *v)
{
    if (!v) return;
    free(v->watches);
    free(v->views);
    free(v->history);
    free(v);
}
