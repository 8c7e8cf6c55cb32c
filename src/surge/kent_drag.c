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
/* Reynolds number that counts as 1: both corners of the friction law, 2000 and 4000,
 * are then edges of bins. */
static const double CORNER = 2000.0;
/* In these units; slower counts as the least, faster as the most. */
static const double LEAST = 0x1p-34, MOST = 0x1.fffffffffffffp16;
enum {
    FRACTION = 49, /* bits of a double that tell where in its bin it is */
    FIRST = (1023 - 34) * KENT_DRAG_OCTAVE /* the bits above them, in LEAST */
};

static double drag_at(const kent_drag_span *d, double speed)
{
    const double factor = kent_friction_factor(d->friction, speed);
    return d->stiffening * (d->per_factor * factor + d->fixed);
}

static uint64_t bits_of(double reynolds)
{
    const double within = reynolds < MOST ? reynolds : MOST;
    const double r = within > LEAST ? within : LEAST; /* NaN too */
    uint64_t bits = 0;
    memcpy(&bits, &r, sizeof bits);
    return bits;
}

static double of_bits(uint64_t bits)
{
    double v = 0.0;
    memcpy(&v, &bits, sizeof v);
    return v;
}

/* The top bits of a double, exponent and three of the fraction, number its bin: eight
 * to an octave, evenly spaced within it. */
static size_t bin_of(uint64_t bits) { return (size_t)((bits >> FRACTION) - FIRST); }

/* 1 at the lower edge of its bin, 9/8 at the upper one. */
static double place_in_bin(uint64_t bits)
{
    const uint64_t below = (UINT64_C(1) << FRACTION) - 1;
    return of_bits((UINT64_C(1023) << 52) | (bits & below));
}

/* k of the law at the lower edge of a bin. */
static double edge_drag(const kent_drag_span *d, size_t bin)
{
    const double reynolds = of_bits((uint64_t)(FIRST + bin) << FRACTION);
    return drag_at(d, reynolds / d->reynolds_per_metre * d->speed_per_metre);
}

/* k in a straight line over a bin, through the law at its edges. */
static kent_drag_line line_over(const kent_drag_span *d, size_t bin)
{
    const double low = edge_drag(d, bin);
    const double slope = KENT_DRAG_OCTAVE * (edge_drag(d, bin + 1) - low);
    return (kent_drag_line){d->trim * (low - slope), d->trim * slope};
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
    d->trim = 1.0;
    d->speed_per_metre = 1.0 / (2.0 * b * span->area);
    d->reynolds_per_metre =
        d->speed_per_metre * span->bore / (CORNER * span->friction.kinematic_viscosity);
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
        char where[sizeof err->where];
        kent_model_place_text(m, m->pipes[m->spans[i].pipe].place, where, sizeof where);
        return kent_error_set(
            err, KENT_E_INPUT, where,
            "span %s: friction takes %.2g of the wave in one reach (R|Q|/B); it needs "
            "at least %.0f reaches: raise min_reaches or shorten time_step",
            m->spans[i].id, steady,
            ceil(grid->reaches[i] * steady / (2.0 * IMPLICIT_FROM)));
    }
    d->implicit[i] = true;
    span->stiffening = 1.0 / (1.0 - steady);
    return KENT_OK;
}

/* At the steady flow the table must give the law itself: all of it is moved by the
 * little that it misses there. */
static void trim_table(kent_drag_span *d, double steady_speed)
{
    const uint64_t bits =
        bits_of(steady_speed / d->speed_per_metre * d->reynolds_per_metre);
    const kent_drag_line line = line_over(d, bin_of(bits));
    const double near = line.at_nil + line.slope * place_in_bin(bits);
    const double law = drag_at(
        d, fmax(steady_speed, LEAST / d->reynolds_per_metre * d->speed_per_metre));
    if (near > 0.0) d->trim = law / near;
}

kent_status kent_drag_new(const kent_model *m, const kent_steady *s,
                          const kent_grid *grid, kent_drag **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    kent_drag *d = kent_alloc(1, sizeof *d);

    if (!d) goto done;
    d->follows = m->solver.friction == KENT_SURGE_QUASI_STEADY ||
                 m->solver.friction == KENT_SURGE_UNSTEADY;
    d->spans = kent_alloc(m->span_count, sizeof *d->spans);
    d->implicit = kent_alloc(m->span_count, sizeof *d->implicit);
    if (!d->spans || !d->implicit) goto done;
    if (d->follows) {
        d->lines = kent_alloc(m->span_count, KENT_DRAG_BINS * sizeof *d->lines);
        if (!d->lines) goto done;
    }
    for (size_t i = 0; i < m->span_count; i++) {
        describe_span(m, grid, i, &d->spans[i]);
        status = choose_scheme(m, s, grid, i, d, err);
        if (status != KENT_OK) goto done;
        if (!d->follows) continue;
        d->spans[i].line = d->lines + i * KENT_DRAG_BINS;
        trim_table(&d->spans[i], starting_speed(m, s, i));
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
    free(d->lines);
    free(d->implicit);
    free(d);
}

void kent_drag_start(kent_drag *d, const kent_model *m, const kent_steady *s,
                     kent_waves *w)
{
    for (size_t i = 0; i < w->span_count; i++) {
        const double k = drag_at(&d->spans[i], starting_speed(m, s, i));
        for (size_t j = 0; j <= w->reaches[i]; j++) {
            w->k[w->first[i] + j] = k;
        }
    }
}

/* drag_at without its cost. lines: those of d, at hand; reynolds: over 2000. */
static inline double drag_near(const kent_drag_span *d, kent_drag_line *lines,
                               double reynolds)
{
    const uint64_t bits = bits_of(reynolds);
    kent_drag_line *line = &lines[bin_of(bits)];
    if (line->at_nil == 0.0) *line = line_over(d, bin_of(bits));
    return line->at_nil + line->slope * place_in_bin(bits);
}

static void follow_flow(const kent_drag_span *d, size_t n, const double *restrict p,
                        const double *restrict m, double *restrict k)
{
    const double scale = d->reynolds_per_metre;
    kent_drag_line *const lines = d->line;
    for (size_t i = 0; i < n; i++) {
        k[i] = drag_near(d, lines, fabs(p[i] - m[i]) * scale);
    }
}

double kent_drag_of(const kent_drag *d, size_t span, double gap, double otherwise)
{
    const kent_drag_span *of = &d->spans[span];
    if (!d->follows) return otherwise;
    return drag_near(of, of->line, fabs(gap) * of->reynolds_per_metre);
}

void kent_drag_refresh(kent_drag *d, kent_waves *w)
{
    if (!d->follows) return;
    for (size_t i = 0; i < w->span_count; i++) {
        const size_t first = w->first[i];
        follow_flow(&d->spans[i], w->reaches[i] + 1, w->p + first, w->m + first,
                    w->k + first);
    }
}
