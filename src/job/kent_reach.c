#include "kent_reach.h"

#include <math.h>

static const double CLEARLY = 1000.0; /* Pa, see kent_reach_of_march */

kent_reached kent_reach_nothing(void) { return (kent_reached){NAN, NAN, NAN, -1, -1}; }

static bool goes_further(kent_search search, double a, double b)
{
    if (isnan(a)) return false;
    return search == KENT_SEARCH_HIGHEST ? !(a <= b) : !(a >= b); /* NaN: the first */
}

kent_reached kent_reach_further(kent_search search, kent_reached a, kent_reached b)
{
    return goes_further(search, b.pressure, a.pressure) ? b : a;
}

/* Pa, of ground water on the pipe, chainage m from the pipe's start; 0: none is stated.
 */
static double outside_at(const kent_model *m, int pipe, double chainage)
{
    const kent_ground_here here = kent_model_ground_at(m, pipe, chainage);
    const double depth = here.cover + 0.5 * m->pipes[pipe].outside_diameter;
    return m->rules.water_unit_weight * fmax(0.0, depth - here.water_table);
}

/* x: m from the span's start. */
static double pressure_at(const kent_model *m, const kent_span *span, double x,
                          double head, kent_search search)
{
    const double inside = kent_model_pressure(m, head, kent_span_level(m, span, x));
    if (search != KENT_SEARCH_OUTWARD) return inside;
    const double start = m->chainage[span->route_first];
    return inside - fmax(0.0, outside_at(m, span->pipe, start + x));
}

kent_reached kent_reach_of_line(const kent_model *m, int span, const double head[2],
                                kent_search search)
{
    const kent_span *s = &m->spans[span];
    kent_reached most = kent_reach_nothing();
    for (size_t k = 0; k < s->route_count; k++) {
        const size_t at = s->route_first + k;
        const double x = m->chainage[at] - m->chainage[s->route_first];
        const double h = head[0] + x / s->length * (head[1] - head[0]);
        const kent_reached here = {pressure_at(m, s, x, h, search), NAN,
                                   m->chainage[at], m->route[at], span};
        most = kent_reach_further(search, most, here);
    }
    return most;
}

/* At a point inside the span, and at its ends: two may meet at a point with a device
 * between them, so that the head there is the span's own. */
static kent_reached at_point(const kent_model *m, const kent_scenario_result *run,
                             int span, size_t k, kent_search search)
{
    static const double SAME = 1e-9; /* m, of head */
    const kent_span *s = &m->spans[span];
    const size_t at = s->route_first + k;
    const bool highest = search == KENT_SEARCH_HIGHEST;
    const double *heads = highest ? run->highest[span] : run->lowest[span];
    const kent_peak *peak = &run->points[m->route[at]];
    const double x = m->chainage[at] - m->chainage[s->route_first];
    double head = highest ? peak->highest_head : peak->lowest_head;
    double time = highest ? peak->highest_at : peak->lowest_at;
    if (k == 0 || k + 1 == s->route_count) {
        const double own = heads[k == 0 ? 0 : run->grid->reaches[span]];
        if (!(fabs(own - head) <= SAME)) time = NAN;
        head = own;
    }
    return (kent_reached){pressure_at(m, s, x, head, search), time, m->chainage[at],
                          m->route[at], span};
}

kent_reached kent_reach_of_march(const kent_model *m, const kent_scenario_result *run,
                                 int span, kent_search search)
{
    const kent_span *s = &m->spans[span];
    const int reaches = run->grid->reaches[span];
    const double *heads =
        search == KENT_SEARCH_HIGHEST ? run->highest[span] : run->lowest[span];
    kent_reached of_points = kent_reach_nothing(), between = kent_reach_nothing();
    for (size_t k = 0; k < s->route_count; k++) {
        of_points =
            kent_reach_further(search, of_points, at_point(m, run, span, k, search));
    }
    for (int n = 1; n < reaches; n++) {
        const double x = s->length * (double)n / (double)reaches;
        const kent_reached here = {pressure_at(m, s, x, heads[n], search), NAN,
                                   m->chainage[s->route_first] + x, -1, span};
        between = kent_reach_further(search, between, here);
    }
    if (!goes_further(search, between.pressure, of_points.pressure)) return of_points;
    if (fabs(between.pressure - of_points.pressure) > CLEARLY) return between;
    of_points.pressure = between.pressure;
    return of_points;
}
