#include "kent_drag_internal.h"

#include <math.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

/* R|Q|/(2B) in the steady state from which a span is swept implicitly: half of what
 * the explicit sweep bears, so that flow may double before a run has to stop. */
static const double IMPLICIT_FROM = 0.125;
/* R|Q|/B beyond which even the implicit sweep cannot hold the steady state: 7.11. */
static const double IMPLICIT_MOST = 0.9;
/* m/s, of a span at rest. */
static const double SPEED_AT_REST = 1.0;
/* m: a span that loses less is at rest. Its friction may then be any, within what a
 * steady state may drift. */
static const double LOSS_AT_REST = 1e-10;
/* Share of |p - m| by which it may move before k is worked out again. */
static const double SWING = 1.0 / 32.0;
enum {
    ROTATION = 128, /* steps in which every node gets its turn, about */
    TABLE = KENT_DRAG_BINS + 1
};

static double drag_of(const kent_drag_span *d, double factor)
{
    return d->stiffening * (d->per_factor * factor + d->fixed);
}

static double drag_at(const kent_drag_span *d, double speed)
{
    const double v = speed > d->slowest ? speed : d->slowest;
    return drag_of(d, kent_friction_factor(d->friction, v));
}

/* The top bits of a double, exponent and four of the fraction, number the bins: 16 to
 * an octave, evenly spaced within it. */
enum { BIN_SHIFT = 48 };

static uint64_t bin_of(double v)
{
    uint64_t bits = 0;
    memcpy(&bits, &v, sizeof bits);
    return bits >> BIN_SHIFT;
}

static double bin_edge(uint64_t bin)
{
    const uint64_t bits = bin << BIN_SHIFT;
    double v = 0.0;
    memcpy(&v, &bits, sizeof v);
    return v;
}

static double edge_factor(const kent_drag_span *d, uint64_t first, uint64_t bin)
{
    double *factor = &d->factor[bin - first];
    if (*factor == 0.0) *factor = kent_friction_factor(d->friction, bin_edge(bin));
    return *factor;
}

/* drag_at without its cost: to 1/1000 of the factor, 1/50 across a corner of the law.
 */
static double drag_near(const kent_drag_span *d, double speed)
{
    const double v = speed > d->slowest ? speed : d->slowest;
    const uint64_t first = bin_of(d->slowest), bin = bin_of(v);
    if (!(v < INFINITY) || bin - first >= KENT_DRAG_BINS) return drag_at(d, speed);
    const double low = bin_edge(bin), high = bin_edge(bin + 1);
    const double f = edge_factor(d, first, bin);
    const double g = edge_factor(d, first, bin + 1);
    return drag_of(d, f + (g - f) * ((v - low) / (high - low)));
}

static bool at_rest(const kent_model *m, const kent_steady *s, size_t span)
{
    double derivative = 0.0;
    const double loss =
        kent_span_loss(m, &m->spans[span], s->span_flow[span], &derivative);
    return fabs(loss) < LOSS_AT_REST;
}

/* m/s: whose friction factor a span starts with. */
static double starting_speed(const kent_model *m, const kent_steady *s, size_t span)
{
    if (m->solver.friction == KENT_SURGE_CONSTANT && at_rest(m, s, span)) {
        return SPEED_AT_REST;
    }
    return fabs(s->span_flow[span]) / m->spans[span].area;
}

static void describe_span(const kent_model *m, const kent_grid *grid, size_t i,
                          kent_drag_span *d)
{
    const kent_span *span = &m->spans[i];
    const double n = grid->reaches[i];
    const double b = grid->wave_speed_used[i] / (m->gravity * span->area);
    const double per_head = /* R = (f dx/D + K/N) per_head x 4B^2: 7.5, 7.7 */
        1.0 / (2.0 * m->gravity * span->area * span->area * 4.0 * b * b);
    const bool none = m->solver.friction == KENT_SURGE_NONE;

    d->friction = &span->friction;
    d->per_factor = none ? 0.0 : span->length / (n * span->bore) * per_head;
    d->fixed = none ? 0.0 : span->loss / n * per_head;
    d->stiffening = 1.0;
    d->speed_per_metre = 1.0 / (2.0 * b * span->area);
    d->slowest = span->friction.kinematic_viscosity / span->bore;
}

/* Whether a span must be swept implicitly, and how stiff k then is. */
static kent_status choose_scheme(const kent_model *m, const kent_steady *s,
                                 const kent_grid *grid, size_t i, kent_drag *d,
                                 kent_error *err)
{
    kent_drag_span *span = &d->spans[i];
    const double steady_speed = fabs(s->span_flow[i]) / m->spans[i].area;
    const double speed = fmax(steady_speed, SPEED_AT_REST);
    const double kd = drag_at(span, m->solver.friction == KENT_SURGE_CONSTANT
                                        ? starting_speed(m, s, i)
                                        : speed) *
                      speed / span->speed_per_metre;
    const double steady = 2.0 * drag_at(span, starting_speed(m, s, i)) * steady_speed /
                          span->speed_per_metre; /* R|Q|/B */

    if (kd <= IMPLICIT_FROM) return KENT_OK;
    if (steady > IMPLICIT_MOST) {
        return kent_error_set(
            err, KENT_E_INPUT, "",
            "span %s: friction takes %.2g of the wave in one reach (R|Q|/B); it needs "
            "at least %.0f reaches: raise min_reaches or shorten time_step",
            m->spans[i].id, steady,
            ceil(grid->reaches[i] * steady / (2.0 * IMPLICIT_FROM)));
    }
    d->implicit[i] = true;
    span->stiffening = 1.0 / (1.0 - steady);
    return KENT_OK;
}

kent_status kent_drag_new(const kent_model *m, const kent_steady *s,
                          const kent_grid *grid, kent_drag **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    kent_drag *d = kent_alloc(1, sizeof *d);

    if (!d) goto done;
    d->follows = m->solver.friction == KENT_SURGE_QUASI_STEADY;
    d->spans = kent_alloc(m->span_count, sizeof *d->spans);
    d->implicit = kent_alloc(m->span_count, sizeof *d->implicit);
    d->swing = kent_alloc(grid->node_total, sizeof *d->swing);
    if (!d->spans || !d->implicit || !d->swing) goto done;
    if (d->follows) {
        d->factors = kent_alloc(m->span_count, TABLE * sizeof *d->factors);
        if (!d->factors) goto done;
    }
    for (size_t i = 0; i < m->span_count; i++) {
        if (d->follows) d->spans[i].factor = d->factors + i * TABLE;
        describe_span(m, grid, i, &d->spans[i]);
        status = choose_scheme(m, s, grid, i, d, err);
        if (status != KENT_OK) goto done;
    }
    *out = d;
    d = NULL;
    status = KENT_OK;
done:
    kent_drag_free(d);
    return status == KENT_E_NOMEM ? kent_error_nomem(err) : status;
}

void kent_drag_free(kent_drag *d)
{
    if (!d) return;
    free(d->spans);
    free(d->factors);
    free(d->implicit);
    free(d->swing);
    free(d);
}

/* Remembers at which flow a node's k was worked out; returns its speed, m/s. */
static double note_swing(kent_drag *d, const kent_waves *w, size_t span, size_t node)
{
    const kent_drag_span *of = &d->spans[span];
    const double swing = fabs(w->p[node] - w->m[node]);
    d->swing[node] = fmax(swing, of->slowest / of->speed_per_metre);
    return swing * of->speed_per_metre;
}

void kent_drag_start(kent_drag *d, const kent_model *m, const kent_steady *s,
                     kent_waves *w)
{
    for (size_t i = 0; i < w->span_count; i++) {
        const double k = drag_at(&d->spans[i], starting_speed(m, s, i));
        for (size_t j = 0; j <= w->reaches[i]; j++) {
            const size_t node = w->first[i] + j;
            w->k[node] = k;
            (void)note_swing(d, w, i, node);
        }
    }
}

static void refresh_moved(kent_drag *d, kent_waves *w, size_t span)
{
    const size_t first = w->first[span], n = w->reaches[span] + 1;
    const double *p = w->p + first, *m = w->m + first, *swing = d->swing + first;
    const double least = d->spans[span].slowest / d->spans[span].speed_per_metre;
    int64_t moved = 0; /* counted first: that loop is vectors, and mostly finds none */

    for (size_t i = 0; i < n; i++) {
        const double now = fabs(p[i] - m[i]);
        const double gap = fabs((now > least ? now : least) - swing[i]);
        moved += gap > SWING * swing[i] ? 1 : 0;
    }
    if (moved == 0) return;
    for (size_t i = 0; i < n; i++) {
        const double now = fabs(p[i] - m[i]);
        const double gap = fabs((now > least ? now : least) - swing[i]);
        if (gap <= SWING * swing[i]) continue;
        w->k[first + i] = drag_near(&d->spans[span], note_swing(d, w, span, first + i));
    }
}

static void refresh_in_rotation(kent_drag *d, kent_waves *w)
{
    for (size_t left = w->node_total / ROTATION + 1; left > 0; left--) {
        const size_t node = w->first[d->next_span] + d->next_node;
        w->k[node] =
            drag_at(&d->spans[d->next_span], note_swing(d, w, d->next_span, node));
        d->next_node++;
        if (d->next_node <= w->reaches[d->next_span]) continue;
        d->next_node = 0;
        d->next_span = d->next_span + 1 < w->span_count ? d->next_span + 1 : 0;
    }
}

void kent_drag_refresh(kent_drag *d, kent_waves *w)
{
    if (!d->follows || w->span_count == 0) return;
    for (size_t span = 0; span < w->span_count; span++) {
        refresh_moved(d, w, span);
    }
    refresh_in_rotation(d, w);
}
