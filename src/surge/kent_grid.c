#include "kent_grid.h"

#include <limits.h>
#include <math.h>
#include <stdlib.h>

/* Most node updates (nodes x steps) of one scenario: some seconds on one core, and four
 * times that for its finer grid. */
static const double UPDATES_MOST = 5e9;
/* A span shorter, in travel time, than this share of the longest is lumped: it takes
 * the reaches the common step leaves it, at least one. */
static const double LUMPED_BELOW = 1.0 / 40.0;
/* It yields too much, which delays what passes it: 7.23. By no more than this share of
 * the longest travel time. */
static const double LUMPED_DELAY = 1.0 / 50.0;
/* Travel times that differ by less than this share are one. */
static const double ROUNDING = 1e-9;
enum { SEARCH_MOST = 100000 }; /* lowerings of the step */

static double travel_time(const kent_span *span)
{
    return span->length / span->wave_speed; /* s */
}

/* Reaches whose wave speed comes nearest to the span's own at a step (s). */
static double nearest_reaches(double travel, double step)
{
    const double below = fmax(floor(travel / step * (1.0 + ROUNDING)), 1.0);
    const double gap_below = fabs(travel / (below * step) - 1.0);
    const double gap_above = fabs(travel / ((below + 1.0) * step) - 1.0);
    return gap_above < gap_below ? below + 1.0 : below;
}

/* The largest step up to `step` at which some whole number of reaches moves the span's
 * wave speed by no more than the tolerance: 7.22. */
static double feasible_step(double travel, double step, double tolerance)
{
    const double reaches = ceil(travel / (step * (1.0 + tolerance)) * (1.0 - ROUNDING));
    const double longest = travel / (reaches * (1.0 - tolerance));
    if (longest >= step * (1.0 - ROUNDING)) return step;
    return longest;
}

typedef struct kent_travels { /* s */
    double sum, longest;
    double shortest, stub; /* the shortest not lumped, the shortest lumped */
} kent_travels;

static kent_travels measure(const kent_model *m)
{
    kent_travels t = {0.0, 0.0, INFINITY, INFINITY};
    for (size_t i = 0; i < m->span_count; i++) {
        t.sum += travel_time(&m->spans[i]);
        t.longest = fmax(t.longest, travel_time(&m->spans[i]));
    }
    for (size_t i = 0; i < m->span_count; i++) {
        const double travel = travel_time(&m->spans[i]);
        double *least = travel < LUMPED_BELOW * t.longest ? &t.stub : &t.shortest;
        *least = fmin(*least, travel);
    }
    return t;
}

/* Shortest step the budget bears: about sum/step + spans nodes, duration/step steps. */
static double budget_step(const kent_model *m, const kent_travels *t, double duration)
{
    const double spans = (double)m->span_count;
    const double share = duration / UPDATES_MOST;
    /* step^2 = share (sum + spans x step); spans twice: rounding up of each */
    const double b = 2.0 * spans * share;
    return 0.5 * (b + sqrt(b * b + 4.0 * share * t->sum));
}

/* Lowers the step until it suits every span that is not lumped. Where none above the
 * least does, the tolerance cannot be had, and the step stays what it was: a finer grid
 * would cost all of the budget and still miss. */
static double search_step(const kent_model *m, const kent_travels *t, double step,
                          double least)
{
    const double wanted = step;
    bool lowered = true;
    for (int turn = 0; lowered && turn < SEARCH_MOST; turn++) {
        lowered = false;
        for (size_t i = 0; i < m->span_count; i++) {
            const double travel = travel_time(&m->spans[i]);
            if (travel < LUMPED_BELOW * t->longest) continue;
            const double suits =
                feasible_step(travel, step, m->solver.wave_speed_tolerance);
            if (suits < step) lowered = true;
            step = suits;
        }
        if (step < least) return wanted;
    }
    return lowered ? wanted : step;
}

static kent_status check_given_step(const kent_model *m, const kent_travels *t,
                                    double least, kent_error *err)
{
    const double step = m->solver.time_step;
    char where[sizeof err->where];
    kent_model_place_text(m, m->solver.place, where, sizeof where);
    if (!(step > 0.0) || !isfinite(step)) {
        return kent_error_set(err, KENT_E_INPUT, where,
                              "time_step %g s is not a positive time", step);
    }
    if (step < least) {
        return kent_error_set(err, KENT_E_INPUT, where,
                              "time_step %g s takes more than %g node updates; %.3g s "
                              "or longer, or leave it out",
                              step, UPDATES_MOST, least);
    }
    if (step > t->longest) {
        return kent_error_set(err, KENT_E_INPUT, where,
                              "time_step %g s is longer than a wave takes through the "
                              "longest span; %.3g s or shorter, or leave it out",
                              step, t->longest);
    }
    return KENT_OK;
}

static kent_status choose_step(const kent_model *m, double duration, double *step,
                               kent_error *err)
{
    *step = 1.0; /* s: nothing to march */
    if (m->span_count == 0) return KENT_OK;
    const kent_travels t = measure(m);
    const double least = budget_step(m, &t, duration);
    if (!isnan(m->solver.time_step)) {
        *step = m->solver.time_step;
        return check_given_step(m, &t, least, err);
    }
    const double wanted = fmin(t.shortest / fmax((double)m->solver.min_reaches, 1.0),
                               sqrt(LUMPED_DELAY * t.longest * t.stub));
    *step =
        wanted <= least ? fmin(least, t.longest) : search_step(m, &t, wanted, least);
    return KENT_OK;
}

static kent_grid *grid_alloc(size_t span_count)
{
    kent_grid *g = kent_alloc(1, sizeof *g);
    if (!g) return NULL;
    g->reaches = kent_alloc(span_count, sizeof *g->reaches);
    g->wave_speed_used = kent_alloc(span_count, sizeof *g->wave_speed_used);
    g->misses = kent_alloc(span_count, sizeof *g->misses);
    if (g->reaches && g->wave_speed_used && g->misses) return g;
    kent_grid_free(g);
    return NULL;
}

kent_status kent_grid_plan(const kent_model *m, double duration, kent_grid **out,
                           kent_error *err)
{
    double step = 0.0;
    const kent_status status = choose_step(m, duration, &step, err);
    if (status != KENT_OK) return status;

    kent_grid *g = grid_alloc(m->span_count);
    if (!g) return kent_error_nomem(err);
    g->step = step;
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        const double reaches = fmin(nearest_reaches(travel_time(span), step), INT_MAX);
        g->reaches[i] = (int)reaches;
        g->wave_speed_used[i] = span->length / (reaches * step);
        const double moved = fabs(g->wave_speed_used[i] / span->wave_speed - 1.0);
        g->misses[i] = moved > m->solver.wave_speed_tolerance + 10.0 * ROUNDING;
        g->miss_count += g->misses[i] ? 1 : 0;
        g->node_total += (size_t)g->reaches[i] + 1;
    }
    *out = g;
    return KENT_OK;
}

kent_status kent_grid_refine(const kent_grid *grid, size_t span_count, int parts,
                             kent_grid **out, kent_error *err)
{
    for (size_t i = 0; i < span_count; i++) {
        if (parts >= 1 && grid->reaches[i] <= INT_MAX / parts) continue;
        return kent_error_set(err, KENT_E_INPUT, "",
                              "%d reaches cannot be cut in %d parts each",
                              grid->reaches[i], parts);
    }
    kent_grid *g = grid_alloc(span_count);
    if (!g) return kent_error_nomem(err);
    g->step = grid->step / parts;
    g->miss_count = grid->miss_count;
    for (size_t i = 0; i < span_count; i++) {
        g->reaches[i] = grid->reaches[i] * parts;
        g->wave_speed_used[i] = grid->wave_speed_used[i];
        g->misses[i] = grid->misses[i];
        g->node_total += (size_t)g->reaches[i] + 1;
    }
    *out = g;
    return KENT_OK;
}

void kent_grid_free(kent_grid *g)
{
    if (!g) return;
    free(g->reaches);
    free(g->wave_speed_used);
    free(g->misses);
    free(g);
}
