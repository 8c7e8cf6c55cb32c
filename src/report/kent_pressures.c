#include "kent_pressures.h"

#include <math.h>
#include <string.h>

static const double CLEARLY = 1000.0; /* Pa, see kent_extreme_highest */

static double least_rating(const kent_model *m, const kent_fitting *fitting,
                           kent_rating rating)
{
    double least = NAN;
    bool own = rating == KENT_RATING_SERVICE || rating == KENT_RATING_TEST;
    for (size_t i = 0; i < fitting->port_count; i++) {
        const int span = m->ports[fitting->port_first + i].span;
        if (span < 0) continue;
        const kent_pipe *pipe = &m->pipes[m->spans[span].pipe];
        least = fmin(least, kent_pipe_rating(pipe, rating)); /* passes over NAN */
        own = own || !isnan(rating == KENT_RATING_SURGE ? pipe->surge_rating
                                                        : pipe->recurring_rating);
    }
    return own ? least : NAN;
}

/* The column that a load case's pressure belongs to. */
static kent_pressure column_of(const kent_load_case *c)
{
    if (c->given) return KENT_PRESSURE_GIVEN;
    if (c->later) return KENT_PRESSURE_FUTURE;
    switch (c->kind) {
    case KENT_CASE_TEST:
        return KENT_PRESSURE_TEST;
    case KENT_CASE_STATIC:
        return KENT_PRESSURE_STATIC;
    case KENT_CASE_SHUT_OFF:
        return KENT_PRESSURE_SHUT_OFF;
    case KENT_CASE_STEADY:
        return KENT_PRESSURE_STEADY;
    case KENT_CASE_SUCTION:
        return KENT_PRESSURE_LOWEST;
    case KENT_CASE_RECURRING:
    case KENT_CASE_OCCASIONAL:
    case KENT_CASE_EXCEPTIONAL:
        break;
    }
    return KENT_PRESSURE_HIGHEST;
}

static void take_scenarios(const kent_results *r, const kent_fitting *fitting,
                           kent_pressures *p)
{
    const kent_model *m = r->model;
    for (size_t s = 0; fitting->point >= 0 && s < r->scenario_count; s++) {
        const kent_peak *peak = &r->scenarios[s].points[fitting->point];
        if (m->scenarios[r->scenarios[s].scenario].for_comparison) continue;
        const double z = fitting->at.z;
        const double high = kent_model_pressure(m, peak->highest_head, z);
        const double low = kent_model_pressure(m, peak->lowest_head, z);
        if (isfinite(high) && !(high <= p->at[KENT_PRESSURE_HIGHEST])) {
            p->at[KENT_PRESSURE_HIGHEST] = high;
            p->highest_in = (int)s;
        }
        if (isfinite(low) && !(low >= p->at[KENT_PRESSURE_LOWEST])) {
            p->at[KENT_PRESSURE_LOWEST] = low;
            p->lowest_in = (int)s;
        }
    }
}

kent_pressures kent_pressures_of(const kent_results *r, size_t fitting)
{
    static const struct {
        const char *name;
        kent_pressure column;
    } NAMED[] = {{"steady", KENT_PRESSURE_STEADY},     {"static", KENT_PRESSURE_STATIC},
                 {"shut-off", KENT_PRESSURE_SHUT_OFF}, {"test", KENT_PRESSURE_TEST},
                 {"future", KENT_PRESSURE_FUTURE},     {"given", KENT_PRESSURE_GIVEN}};
    const kent_fitting *f = &r->model->fittings[fitting];
    const kent_fitting_loads *loads = &r->loads->fittings[fitting];
    const kent_holding *h = &r->restraints->fittings[fitting];
    kent_pressures p = {.governs = -1, .highest_in = -1, .lowest_in = -1};
    for (int k = 0; k < KENT_RATINGS; k++) {
        p.rating[k] = least_rating(r->model, f, (kent_rating)k);
    }
    for (size_t k = 0; k < KENT_PRESSURES; k++) {
        p.at[k] = NAN;
    }
    for (size_t c = 0; c < loads->count; c++) {
        const kent_load_case *load = &loads->cases[c];
        for (size_t k = 0; k < sizeof NAMED / sizeof NAMED[0]; k++) {
            if (load->scenario >= 0 || strcmp(load->name, NAMED[k].name) != 0) continue;
            if (!load->worst[KENT_RESULTANT].set) continue;
            double *at = &p.at[NAMED[k].column]; /* of steady states the highest */
            *at = fmax(*at, load->worst[KENT_RESULTANT].pressure);
        }
    }
    take_scenarios(r, f, &p);
    if (h->governing >= 0 && (size_t)h->governing < loads->count) {
        p.governs = (int)column_of(&loads->cases[h->governing]);
    }
    return p;
}

/* Looks along the points, then between them. sign +1: for the highest, -1: lowest. */
static kent_extreme extreme_of(const kent_results *r, size_t scenario, double sign)
{
    const kent_model *m = r->model;
    const kent_scenario_result *s = &r->scenarios[scenario];
    kent_extreme e = {NAN, NAN, -1, -1, NAN, (int)scenario};
    for (size_t p = 0; p < m->point_count; p++) {
        const kent_peak *peak = &s->points[p];
        const double head = sign > 0.0 ? peak->highest_head : peak->lowest_head;
        const double pressure = kent_model_pressure(m, head, m->points[p].at.z);
        if (!isfinite(pressure) || sign * pressure <= sign * e.pressure) continue;
        e.pressure = pressure;
        e.time = sign > 0.0 ? peak->highest_at : peak->lowest_at;
        e.point = (int)p;
    }
    double to_beat = e.pressure + sign * CLEARLY;
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        const double *head = sign > 0.0 ? s->highest[i] : s->lowest[i];
        const int reaches = s->grid->reaches[i];
        for (int k = 0; k <= reaches; k++) {
            const double x = span->length * k / reaches;
            const double z = kent_span_level(m, span, x);
            const double pressure = kent_model_pressure(m, head[k], z);
            if (!isfinite(pressure) || sign * pressure <= sign * to_beat) continue;
            e = (kent_extreme){pressure, NAN, -1, (int)i, NAN, (int)scenario};
            e.chainage = m->chainage[span->route_first] + x;
            to_beat = pressure;
        }
    }
    return e;
}

kent_extreme kent_extreme_highest(const kent_results *r, size_t scenario)
{
    return extreme_of(r, scenario, 1.0);
}

kent_extreme kent_extreme_lowest(const kent_results *r, size_t scenario)
{
    return extreme_of(r, scenario, -1.0);
}

void kent_point_steady_heads(const kent_model *m, const kent_steady *s, double *head)
{
    for (size_t p = 0; p < m->point_count; p++) {
        head[p] = NAN;
    }
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        for (size_t k = 0; k < span->route_count; k++) {
            const size_t at = span->route_first + k;
            const double x = m->chainage[at] - m->chainage[span->route_first];
            head[m->route[at]] = kent_steady_head(m, s, (int)i, x);
        }
    }
}
