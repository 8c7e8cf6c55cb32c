#include "kent_run.h"

#include <math.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;

double kent_run_force(double area, double density, double gravity,
                      const kent_run_state *at)
{
    const double head = at->head[1] - at->head[0];
    const double drag = 0.5 * (at->loss[0] + at->loss[1]);
    const double flux = at->momentum_factor[1] * at->flow[1] * at->flow[1] -
                        at->momentum_factor[0] * at->flow[0] * at->flow[0];

    return density * (gravity * area * (head + drag) + flux / area);
}

/* ---- where they are -------------------------------------------------------------- */

/* Whether the main turns or changes size at a point within a span. */
static bool breaks_at(const kent_model *m, const bool *turns, int point)
{
    return turns[point] || !isnan(m->points[point].curve_radius);
}

static void mark_turn(const kent_model *m, const kent_fitting *f, bool *turns)
{
    switch (f->type) {
    case KENT_BEND:
    case KENT_CURVE:
    case KENT_REDUCER:
    case KENT_GROUP:
    case KENT_VALVE:
        break;
    case KENT_TEE:
    case KENT_WYE:
    case KENT_CROSS:
    case KENT_DEAD_END:
    case KENT_STRAIGHT:
        return; /* of a run that goes on: where it does not, its span ends */
    }
    if (f->point >= 0) turns[f->point] = true;
    for (size_t i = f->member_first; i < f->member_first + f->member_count; i++) {
        turns[m->members[i]] = true;
    }
}

/* N per m of empty pipe; NAN: not known. source 11.1 */
static double pipe_weight(const kent_pipe *p, double gravity)
{
    const double mean = p->outside_diameter - p->wall;

    if (!isnan(p->unit_mass)) return p->unit_mass * gravity;
    return PI * mean * p->wall * p->material_density * gravity;
}

static kent_run run_between(const kent_model *m, size_t span, size_t first, size_t last)
{
    const kent_span *s = &m->spans[span];
    const kent_pipe *pipe = &m->pipes[s->pipe];
    const kent_vec3 from = m->points[m->route[first]].at;
    const kent_vec3 to = m->points[m->route[last]].at;
    const double length = m->chainage[last] - m->chainage[first];
    const double rise = to.z - from.z;

    return (kent_run){
        .span = (int)span,
        .from = m->route[first],
        .to = m->route[last],
        .start = m->chainage[first] - m->chainage[s->route_first],
        .end = m->chainage[last] - m->chainage[s->route_first],
        .length = length,
        .area = s->area,
        .rise = rise,
        .axis = kent_vec3_unit(kent_vec3_sub(to, from)),
        .water_weight = -m->water.density * m->gravity * s->area * rise, /* 24.4 */
        .pipe_weight = -pipe_weight(pipe, m->gravity) * rise,
        .slips = kent_joint_slips(pipe->joint),
    };
}

static size_t runs_of_span(const kent_model *m, const bool *turns, size_t span,
                           kent_run *out)
{
    const kent_span *s = &m->spans[span];
    const size_t last = s->route_first + s->route_count - 1;
    size_t first = s->route_first, count = 0;

    if (!m->pipes[s->pipe].above_ground) return 0;
    for (size_t k = first + 1; k <= last; k++) {
        if (k < last && !breaks_at(m, turns, m->route[k])) continue;
        out[count++] = run_between(m, span, first, k);
        first = k;
    }
    return count;
}

kent_status kent_runs_find(const kent_model *m, kent_run **out, size_t *count,
                           kent_error *err)
{
    bool *turns = kent_alloc(m->point_count, sizeof *turns);
    kent_run *runs = kent_alloc(m->route_count, sizeof *runs);

    if (!turns || !runs) {
        free(turns);
        free(runs);
        return kent_error_nomem(err);
    }
    for (size_t i = 0; i < m->fitting_count; i++) {
        mark_turn(m, &m->fittings[i], turns);
    }
    *count = 0;
    for (size_t i = 0; i < m->span_count; i++) {
        *count += runs_of_span(m, turns, i, runs + *count);
    }
    free(turns);
    *out = runs;
    return KENT_OK;
}

void kent_runs_free(kent_run *runs, size_t count)
{
    for (size_t i = 0; runs && i < count; i++) {
        for (size_t k = 0; runs[i].marches && k < runs[i].march_count; k++) {
            free(runs[i].marches[k].history);
        }
        free(runs[i].marches);
    }
    free(runs);
}

kent_run_worst kent_run_most(const kent_model *m, const kent_run *run, bool forward)
{
    kent_run_worst most = {0.0, NAN, -1};

    for (size_t k = 0; k < run->march_count; k++) {
        const kent_run_march *march = &run->marches[k];
        const kent_run_moment at = forward ? march->highest : march->lowest;
        if (!march->set || m->scenarios[m->marches[k].scenario].for_comparison) {
            continue;
        }
        if (forward ? !(at.force > most.force) : !(at.force < most.force)) continue;
        most = (kent_run_worst){at.force, at.time, (int)k};
    }
    return most;
}
