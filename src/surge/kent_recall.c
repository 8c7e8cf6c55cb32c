#include "kent_recall_internal.h"

#include <math.h>
#include <stdlib.h>

const double KENT_RECALL_SLOW = 0.05, KENT_RECALL_AT_REST = 1.0;
static const double E = 2.71828182845904523536;

/* ---- how much there is ----------------------------------------------------------- */

/* The Reynolds number that a span's friction remembers by: 16.13. */
static double reynolds_of(const kent_span *span, double flow)
{
    const double steady = fabs(flow) / span->area; /* m/s */
    const double speed = steady < KENT_RECALL_SLOW ? KENT_RECALL_AT_REST : steady;
    return speed * span->bore / span->friction.kinematic_viscosity;
}

static bool pulls(const kent_model *m, const kent_span *span)
{
    return m->solver.friction == KENT_SURGE_UNSTEADY &&
           span->friction.law != KENT_FRICTIONLESS;
}

/* 16.1 in the waves' own numbers: 16.14, 16.15. */
static kent_weighting weighting_of(const kent_model *m, const kent_steady *s,
                                   const kent_grid *grid, size_t i, double *step)
{
    const kent_span *span = &m->spans[i];
    *step = 4.0 * span->friction.kinematic_viscosity * grid->step /
            (span->bore * span->bore);
    return kent_weighting_sum(reynolds_of(span, s->span_flow[i]), *step);
}

static size_t creep_terms(const kent_model *m, const kent_span *span)
{
    return m->solver.creep ? m->pipes[span->pipe].creep_count : 0;
}

double kent_recall_softness(const kent_model *m, const kent_span *span,
                            double wave_speed)
{
    const kent_pipe *pipe = &m->pipes[span->pipe];
    const double between = 0.5 * (pipe->outside_diameter - pipe->inside_diameter);
    const kent_wall wall = {.bore = span->bore,
                            .thickness =
                                isnan(pipe->wall) ? between - pipe->lining : pipe->wall,
                            .modulus = pipe->modulus,
                            .poisson = pipe->poisson,
                            .lining = pipe->lining,
                            .lining_modulus = pipe->lining_modulus};
    return wave_speed * wave_speed * m->water.density *
           kent_wave_support_factor(&wall, pipe->axial_support, pipe->thin_wall) *
           span->bore / kent_wave_equivalent_thickness(&wall);
}

/* ---- building -------------------------------------------------------------------- */

/* e^-z, the same bits everywhere. */
static double fading(double z) { return z < 600.0 ? kent_pow(E, -z) : 0.0; }

/* 16.14: what a change by one leaves, already faded for the next step. */
static void describe_pull(const kent_weighting *w, double step, double *fade,
                          double *gain, double *share)
{
    *share = 2.0 * w->at_once;
    for (size_t i = 0; i < w->count; i++) {
        fade[i] = fading(w->rate[i] * step);
        const double acts = 2.0 * w->weight[i] * (1.0 - fade[i]) / w->rate[i];
        gain[i] = fade[i] * acts;
        *share += acts;
    }
}

/* 16.22 */
static void describe_wall(const kent_model *m, const kent_span *span, double softness,
                          double step, double *fade, double *gain, double *share)
{
    const kent_pipe *pipe = &m->pipes[span->pipe];
    const kent_creep *element = m->creep + pipe->creep_first;
    *share = 0.0;
    for (size_t i = 0; i < pipe->creep_count; i++) {
        fade[i] = fading(step / element[i].time);
        const double yields = (1.0 - fade[i]) * softness * element[i].compliance;
        gain[i] = (1.0 - fade[i]) * yields;
        *share += yields;
    }
}

typedef struct kent_supply { /* what is left of the two pools */
    double *terms, *states;
} kent_supply;

static kent_fade fade_of(const kent_waves *w, size_t span, size_t terms,
                         kent_supply *supply)
{
    const size_t nodes = w->reaches[span] + 1;
    kent_fade f = {.first = w->first[span], .nodes = nodes, .terms = terms};
    f.fade = supply->terms;
    f.gain = supply->terms + terms;
    f.v = supply->states;
    f.sum = supply->states + terms * nodes;
    f.past = f.sum + nodes;
    supply->terms += 2 * terms;
    supply->states += (terms + 2) * nodes;
    return f;
}

static void fill(kent_recall *r, const kent_model *m, const kent_steady *s,
                 const kent_grid *grid, const kent_waves *w)
{
    kent_supply supply = {r->terms, r->pool};
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        if (pulls(m, span)) {
            double step = 0.0;
            const kent_weighting weighting = weighting_of(m, s, grid, i, &step);
            double *terms = supply.terms;
            kent_fade *f = &r->pulls[r->pull_count++];
            *f = fade_of(w, i, weighting.count, &supply);
            describe_pull(&weighting, step, terms, terms + weighting.count, &f->share);
        }
        const size_t count = creep_terms(m, span);
        if (count > 0) {
            double *terms = supply.terms;
            kent_fade *f = &r->walls[r->wall_count++];
            *f = fade_of(w, i, count, &supply);
            describe_wall(m, span,
                          kent_recall_softness(m, span, grid->wave_speed_used[i]),
                          grid->step, terms, terms + count, &f->share);
        }
    }
}

typedef struct kent_need {
    size_t pulls, walls, terms, states;
} kent_need;

static kent_status measure(const kent_model *m, const kent_steady *s,
                           const kent_grid *grid, kent_need *need, kent_error *err)
{
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        const size_t nodes = (size_t)grid->reaches[i] + 1;
        const size_t walls = creep_terms(m, span);
        if (pulls(m, span)) {
            double step = 0.0;
            const size_t terms = weighting_of(m, s, grid, i, &step).count;
            need->pulls++;
            need->terms += 2 * terms;
            need->states += (terms + 2) * nodes;
        }
        if (walls == 0) continue;
        if (!(kent_recall_softness(m, span, 1.0) > 0.0)) {
            const kent_pipe *pipe = &m->pipes[span->pipe];
            char where[sizeof err->where];
            kent_model_place_text(m, pipe->place, where, sizeof where);
            return kent_error_set(err, KENT_E_INPUT, where,
                                  "pipe %s creeps, and how far hangs on its wall and "
                                  "poisson_ratio: give them, or set creep = false in "
                                  "solver",
                                  pipe->id);
        }
        need->walls++;
        need->terms += 2 * walls;
        need->states += (walls + 2) * nodes;
    }
    return KENT_OK;
}

kent_status kent_recall_new(const kent_model *m, const kent_steady *s,
                            const kent_grid *grid, const kent_waves *w,
                            kent_recall **out, kent_error *err)
{
    kent_need need = {0};
    kent_recall *r = NULL;
    kent_status status = measure(m, s, grid, &need, err);

    *out = NULL;
    if (status != KENT_OK || need.pulls + need.walls == 0) return status;
    status = KENT_E_NOMEM;
    r = kent_alloc(1, sizeof *r);
    if (!r) goto done;
    r->pulls = kent_alloc(need.pulls, sizeof *r->pulls);
    r->walls = kent_alloc(need.walls, sizeof *r->walls);
    r->terms = kent_alloc(need.terms, sizeof *r->terms);
    r->pool = kent_alloc(need.states, sizeof *r->pool);
    if (!r->pulls || !r->walls || !r->terms || !r->pool) goto done;
    fill(r, m, s, grid, w);
    *out = r;
    r = NULL;
    status = KENT_OK;
done:
    kent_recall_free(r);
    return status == KENT_OK ? KENT_OK : kent_error_nomem(err);
}

void kent_recall_free(kent_recall *r)
{
    if (!r) return;
    free(r->pulls);
    free(r->walls);
    free(r->terms);
    free(r->pool);
    free(r);
}

/* ---- marching -------------------------------------------------------------------- */

void kent_recall_start(kent_recall *r, const kent_waves *w)
{
    if (!r) return;
    for (size_t i = 0; i < r->pull_count; i++) {
        const kent_fade *f = &r->pulls[i];
        for (size_t j = 0; j < f->nodes; j++) {
            f->past[j] = w->p[f->first + j] - w->m[f->first + j];
        }
    }
    for (size_t i = 0; i < r->wall_count; i++) {
        const kent_fade *f = &r->walls[i];
        for (size_t j = 0; j < f->nodes; j++) {
            f->past[j] = w->p[f->first + j] + w->m[f->first + j];
        }
    }
}

void kent_recall_pull(const kent_recall *r, const kent_kernel *kernel, kent_waves *w)
{
    for (size_t i = 0; r && i < r->pull_count; i++) {
        const kent_fade *f = &r->pulls[i];
        kernel->recall(f, w->p + f->first, w->m + f->first);
    }
}

void kent_recall_yield(const kent_recall *r, const kent_kernel *kernel, kent_waves *w)
{
    for (size_t i = 0; r && i < r->wall_count; i++) {
        const kent_fade *f = &r->walls[i];
        kernel->yield(f, w->p + f->first, w->m + f->first);
    }
}
