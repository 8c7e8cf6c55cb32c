#include "kent_along.h"

#include <math.h>

/* Relative: outside diameters that differ by less are one. */
static const double SAME_SIZE = 1e-3;

size_t kent_pipe_first_span(const kent_model *m, int pipe)
{
    size_t lo = 0, hi = m->span_count;

    while (lo < hi) {
        const size_t mid = lo + (hi - lo) / 2;
        if (m->spans[mid].pipe < pipe) {
            lo = mid + 1;
        } else {
            hi = mid;
        }
    }
    return lo;
}

double kent_span_start(const kent_model *m, const kent_span *span)
{
    const size_t start = m->pipes[span->pipe].route_first;
    return m->chainage[span->route_first] - m->chainage[start];
}

size_t kent_pipe_span_at(const kent_model *m, int pipe, double chainage)
{
    const size_t first = kent_pipe_first_span(m, pipe);
    size_t lo = first, hi = kent_pipe_first_span(m, pipe + 1);

    while (hi - lo > 1) {
        const size_t mid = lo + (hi - lo) / 2;
        if (kent_span_start(m, &m->spans[mid]) < chainage) {
            lo = mid;
        } else {
            hi = mid;
        }
    }
    return lo;
}

double kent_pipe_laid(const kent_model *m, int pipe)
{
    const kent_pipe *p = &m->pipes[pipe];
    const size_t last = p->route_first + p->route_count - 1;
    return m->chainage[last] - m->chainage[p->route_first];
}

size_t kent_stop_search(const kent_model *m, size_t first, size_t count,
                        double chainage)
{
    size_t lo = first, hi = first + count;

    while (lo < hi) {
        const size_t mid = lo + (hi - lo) / 2;
        if (m->chainage[mid] - m->chainage[first] < chainage) {
            lo = mid + 1;
        } else {
            hi = mid;
        }
    }
    return lo;
}

kent_along kent_along_of(const kent_model *m, const kent_port *port)
{
    const kent_span *span = &m->spans[port->span];
    return (kent_along){.pipe = span->pipe,
                        .ahead = port->sign > 0.0,
                        .at = kent_span_start(m, span) + port->chainage};
}

double kent_along_left(const kent_model *m, kent_along way)
{
    return way.ahead ? kent_pipe_laid(m, way.pipe) - way.at : way.at;
}

double kent_along_place(kent_along way, double away)
{
    return way.ahead ? way.at + away : way.at - away;
}

/* The node at which the way's pipe ends, and the end that it is. */
static const kent_node *way_node(const kent_model *m, kent_along way, kent_end *end)
{
    const size_t span = way.ahead ? kent_pipe_first_span(m, way.pipe + 1) - 1
                                  : kent_pipe_first_span(m, way.pipe);

    *end = (kent_end){(int)span, way.ahead ? 1 : 0};
    return &m->nodes[m->spans[span].node[end->side]];
}

bool kent_along_on(const kent_model *m, kent_along way, kent_along *next)
{
    kent_end here;
    const kent_node *node = way_node(m, way, &here);

    if (node->end_count != 2 || node->kind == KENT_NODE_FIXED_LEVEL ||
        node->kind == KENT_NODE_VALVE) {
        return false;
    }
    const kent_end *ends = &m->ends[node->end_first];
    const bool first = ends[0].span == here.span && ends[0].side == here.side;
    const kent_end beyond = ends[first ? 1 : 0];
    const int pipe = m->spans[beyond.span].pipe;
    const double a = m->pipes[way.pipe].outside_diameter;
    const double b = m->pipes[pipe].outside_diameter;
    if (pipe == way.pipe || !(fabs(a - b) <= SAME_SIZE * a)) return false;
    const bool ahead = beyond.side == 0;
    *next = (kent_along){pipe, ahead, ahead ? 0.0 : kent_pipe_laid(m, pipe)};
    return true;
}

double kent_along_rise(const kent_model *m, kent_along way, double away, bool beyond)
{
    const kent_pipe *p = &m->pipes[way.pipe];
    const size_t last = p->route_first + p->route_count - 1;
    const double step = beyond == way.ahead ? KENT_SAME_PLACE : -KENT_SAME_PLACE;
    const double place = kent_along_place(way, away) + step;
    size_t to = kent_stop_search(m, p->route_first, p->route_count, place);

    if (to <= p->route_first) to = p->route_first + 1;
    if (to > last) to = last;
    const double rise = m->points[m->route[to]].at.z - m->points[m->route[to - 1]].at.z;
    const double along = m->chainage[to] - m->chainage[to - 1];
    const double slope = fmax(-1.0, fmin(1.0, rise / along));
    return way.ahead ? slope : -slope;
}
