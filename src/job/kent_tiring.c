#include "kent_tiring.h"

#include <math.h>

static const double DAY = 86400.0; /* s */

/* The point at a grid node of a span; -1: between points. */
static int point_at(const kent_model *m, const kent_span *s, int node, int reaches)
{
    if (node == 0) return m->route[s->route_first];
    if (node == reaches) return m->route[s->route_first + s->route_count - 1];
    return -1;
}

static void look_along(const kent_model *m, const kent_scenario_result *run,
                       size_t span, kent_tiring *out)
{
    const kent_span *s = &m->spans[span];
    const int reaches = run->grid->reaches[span];
    for (int n = 0; n <= reaches; n++) {
        const double x = s->length * (double)n / (double)reaches;
        const double z = kent_span_level(m, s, x);
        const double high = kent_model_pressure(m, run->highest[span][n], z);
        const double low = kent_model_pressure(m, run->lowest[span][n], z);
        const double amplitude = 0.5 * (high - low); /* 18.7 */
        if (!(amplitude > out->amplitude)) continue;
        out->amplitude = amplitude;
        out->mean = 0.5 * (high + low);
        out->highest = high;
        out->lowest = low;
        out->chainage = m->chainage[s->route_first] + x;
        out->point = point_at(m, s, n, reaches);
    }
}

bool kent_tiring_of(const kent_results *r, size_t march, size_t pipe, kent_tiring *out)
{
    static const double NOTHING = 1.0; /* Pa */
    const kent_model *m = r->model;
    const kent_scenario_result *run = &r->scenarios[march];
    const kent_scenario *s = &m->scenarios[run->scenario];
    const kent_pipe *p = &m->pipes[pipe];
    if (!p->plastic || s->class_of != KENT_RECURRING || s->for_comparison) return false;
    *out = (kent_tiring){.amplitude = NOTHING,
                         .mean = NAN,
                         .highest = NAN,
                         .lowest = NAN,
                         .chainage = NAN,
                         .point = -1,
                         .rating = kent_pipe_rating(p, KENT_RATING_SERVICE),
                         .cycles = s->cycles_per_day * m->asked.life / DAY};
    for (size_t i = 0; i < m->span_count; i++) {
        if ((size_t)m->spans[i].pipe == pipe) look_along(m, run, i, out);
    }
    return !isnan(out->mean);
}
