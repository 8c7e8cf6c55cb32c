#include "kent_pull_internal.h"
#include "kent_leg_internal.h"

#include <math.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;

/* source docs/theory/23-pull.md, 23.1: kept from shortening, a thick wall under
 * pressure is pulled by poisson (hoop + radial), and that sum is the same all through
 */
double kent_pull_of_pressure(double pressure, double poisson, double inside)
{
    return 2.0 * poisson * pressure * 0.25 * PI * inside * inside;
}

double kent_pull_of_pressure_mean(double pressure, double poisson, double outside,
                                  double wall)
{
    const double hoop = pressure * (outside - wall) / (2.0 * wall);
    return poisson * hoop * PI * (outside - wall) * wall;
}

double kent_pull_of_end_face(double pressure, double outside, double inside)
{
    return pressure * 0.25 * PI * (outside * outside - inside * inside);
}

double kent_pull_of_cooling(double modulus, double expansion, double cooling,
                            double area)
{
    return modulus * expansion * cooling * area;
}

double kent_pull_development(double pull, double friction) { return pull / friction; }

double kent_pull_movement(double pull, double friction, double stiffness, double length)
{
    const double bound = 2.0 * kent_pull_development(pull, friction);

    if (length >= bound) return pull * pull / (2.0 * friction * stiffness);
    return (0.5 * pull * length - 0.125 * friction * length * length) / stiffness;
}

const char *kent_pull_holder_word(kent_pull_holder holder)
{
    switch (holder) {
    case KENT_PULL_NOTHING:
        return "nothing";
    case KENT_PULL_WALL:
        return "wall";
    case KENT_PULL_ANCHOR:
        return "anchor-block";
    case KENT_PULL_JOINTS:
        return "restrained-joints";
    case KENT_PULL_ITSELF:
        return "itself";
    }
    return "";
}

/* ---- the ground ------------------------------------------------------------------ */

double kent_pull_wall_area(const kent_pipe *p)
{
    return PI * (p->outside_diameter - p->wall) * p->wall;
}

double kent_pull_pipe_weight(const kent_pipe *p, double gravity)
{
    if (!isnan(p->unit_mass)) return p->unit_mass * gravity;
    return kent_pull_wall_area(p) * p->material_density * gravity;
}

/* A place on plain pipe as a fitting there would be described. */
static kent_fitting place_on(const kent_model *m, int span, double chainage,
                             double sign)
{
    const kent_span *s = &m->spans[span];
    const kent_pipe *pipe = &m->pipes[s->pipe];
    const double start =
        m->chainage[s->route_first] - m->chainage[pipe->route_first] + chainage;
    const kent_ground_here here =
        kent_model_ground_at(m, s->pipe, start + (sign > 0.0 ? 1e-6 : -1e-6));

    return (kent_fitting){
        .point = -1,
        .type = KENT_DEAD_END,
        .zone = here.zone,
        .soil = here.soil,
        .trench = here.trench,
        .backfill = here.backfill,
        .cover = here.cover,
        .water_table = here.water_table,
        .outside_diameter = pipe->outside_diameter,
    };
}

bool kent_pull_friction(const kent_model *m, int span, double chainage, double sign,
                        double demand, double *length, double *friction)
{
    const kent_pipe *pipe = &m->pipes[m->spans[span].pipe];
    const kent_fitting place = place_on(m, span, chainage, sign);
    kent_leg_work w = {
        .pipe = pipe, .factor = 1.0, .demand = demand, .limit = INFINITY};
    kent_port port = kent_port_blank();

    if (pipe->above_ground || !(demand > 0.0)) return false;
    port.span = span;
    port.chainage = chainage;
    port.sign = sign;
    if (kent_leg_pieces(m, &place, &port, &w) != 0) return false;
    *length = w.length;
    *friction = demand / w.length;
    return isfinite(w.length);
}

/* ---- everything ------------------------------------------------------------------ */

static bool notes_lost(const kent_notes *cautions, const kent_derivation *d)
{
    return cautions->failed || d->failed;
}

static kent_status find_ends(const kent_model *m, const kent_loads_result *loads,
                             const kent_holding *holdings, kent_pulls *out)
{
    const kent_strings *strings = &loads->strings;

    out->ends = kent_alloc(strings->end_count, sizeof *out->ends);
    if (!out->ends) return KENT_E_NOMEM;
    for (; out->end_count < strings->end_count; out->end_count++) {
        const size_t i = out->end_count;
        const kent_string_end *e = &strings->ends[i];
        kent_pull_end *p = &out->ends[i];
        kent_pull_end_find(m, loads, holdings, i, p);
        kent_pull_end_derive(m, e, strings->length[e->string], p);
        if (notes_lost(&p->cautions, &p->derivation)) {
            out->end_count++; /* it holds notes too */
            return KENT_E_NOMEM;
        }
    }
    return KENT_OK;
}

static kent_status find_legs(const kent_model *m, const kent_loads_result *loads,
                             kent_holding *holdings, kent_pulls *out)
{
    size_t most = 0;

    for (size_t i = 0; i < m->fitting_count; i++) {
        most += holdings[i].leg_count;
    }
    out->legs = kent_alloc(most, sizeof *out->legs);
    if (!out->legs) return KENT_E_NOMEM;
    for (size_t i = 0; i < m->fitting_count; i++) {
        kent_holding *h = &holdings[i];
        kent_pull_ratings(m, &m->fittings[i], &loads->fittings[i], h);
        kent_pull_legs(m, i, h, out->legs, &out->leg_count);
        if (notes_lost(&h->cautions, &h->derivation)) return KENT_E_NOMEM;
    }
    return KENT_OK;
}

static kent_status find_steeps(const kent_model *m, kent_pulls *out)
{
    out->steeps = kent_alloc(m->route_count, sizeof *out->steeps);
    if (!out->steeps) return KENT_E_NOMEM;
    for (size_t i = 0; i < m->pipe_count; i++) {
        kent_steep_find(m, (int)i, out->steeps, &out->steep_count);
    }
    for (size_t i = 0; i < out->steep_count; i++) {
        const kent_steep *s = &out->steeps[i];
        if (notes_lost(&s->cautions, &s->derivation)) return KENT_E_NOMEM;
    }
    return KENT_OK;
}

kent_status kent_pulls_find(const kent_model *m, const kent_loads_result *loads,
                            kent_holding *holdings, kent_pulls *out, kent_error *err)
{
    kent_status status = find_ends(m, loads, holdings, out);

    if (status == KENT_OK) status = find_legs(m, loads, holdings, out);
    if (status == KENT_OK) status = find_steeps(m, out);
    return status == KENT_OK ? KENT_OK : kent_error_nomem(err);
}

void kent_pulls_clear(kent_pulls *p)
{
    for (size_t i = 0; i < p->end_count; i++) {
        kent_notes_clear(&p->ends[i].cautions);
        kent_derivation_clear(&p->ends[i].derivation);
    }
    for (size_t i = 0; i < p->steep_count; i++) {
        kent_notes_clear(&p->steeps[i].cautions);
        kent_derivation_clear(&p->steeps[i].derivation);
    }
    free(p->ends);
    free(p->legs);
    free(p->steeps);
    *p = (kent_pulls){0};
}
