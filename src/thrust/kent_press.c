#include "kent_press_internal.h"

#include <math.h>

/* Pressures that differ by less than this share are one: the first case named has it.
 */
static const double SAME = 1e-9;

double kent_press_factor(const kent_model *m, kent_case_kind kind)
{
    if (!isnan(m->loads.factor[kind])) return m->loads.factor[kind];
    if (kind == KENT_CASE_TEST && !isnan(m->rules.factor_test)) {
        return m->rules.factor_test;
    }
    return m->rules.safety_factor;
}

kent_case_kind kent_press_kind_of(const kent_scenario *s)
{
    switch (s->class_of) {
    case KENT_RECURRING:
        return KENT_CASE_RECURRING;
    case KENT_OCCASIONAL:
        return KENT_CASE_OCCASIONAL;
    case KENT_EXCEPTIONAL:
        break;
    }
    return KENT_CASE_EXCEPTIONAL;
}

/* Pa at the fitting's centre, from a pressure read at a gauge (-1: at the centre). */
static double from_gauge(const kent_model *m, const kent_fitting *f, double pressure,
                         int gauge)
{
    const double level = gauge >= 0 ? m->points[gauge].at.z : f->at.z;
    return pressure + m->water.density * m->gravity * (level - f->at.z);
}

double kent_press_of_test(const kent_model *m, const kent_site_test *test,
                          const kent_fitting *f)
{
    return from_gauge(m, f, test->pressure, test->gauge);
}

/* Fittings held as one may stand on several mains: the highest counts. */
double kent_press_static(const kent_model *m, const kent_fitting *f)
{
    double level = NAN;

    for (size_t k = f->port_first; k < f->port_first + f->port_count; k++) {
        const kent_port *port = &m->ports[k];
        if (port->kind != KENT_PORT_SPAN) continue;
        level = fmax(level, kent_static_level(m, m->spans[port->span].node[0]));
    }
    return kent_model_pressure(m, level, f->at.z);
}

double kent_press_shut_off(const kent_model *m, const kent_fitting *f)
{
    double level = NAN;

    for (size_t k = f->port_first; k < f->port_first + f->port_count; k++) {
        const kent_port *port = &m->ports[k];
        if (port->kind != KENT_PORT_SPAN) continue;
        level = fmax(level, kent_shut_off_level(m, port->span));
    }
    return kent_model_pressure(m, level, f->at.z);
}

double kent_press_later(const kent_model *m, const kent_fitting *f)
{
    return from_gauge(m, f, m->loads.future_pressure, m->loads.future_gauge);
}

/* On each unit of pressure: in full, or of soil that may bear more in some cases. */
static double asks_for(const kent_model *m, kent_case_kind kind, bool in_full)
{
    return kent_press_factor(m, kind) /
           (in_full ? 1.0 : m->loads.bearing_increase[kind]);
}

/* Keeps the one that asks for more: with factors of their own the higher pressure need
 * not be it. */
void kent_press_take(const kent_model *m, kent_press *most, kent_press p)
{
    const double asks = asks_for(m, p.kind, most->in_full) * p.pressure;
    const double asked = asks_for(m, most->kind, most->in_full) * most->pressure;

    p.in_full = most->in_full;
    if (isnan(p.pressure)) return; /* there is no such case */
    if (isnan(most->pressure) || asks > asked + SAME * fabs(asked)) *most = p;
}

static void press_take_marches(const kent_recorder *r, size_t fitting, size_t port,
                               bool whole, kent_press *most)
{
    const kent_model *m = r->model;

    for (size_t i = 0; i < m->march_count; i++) {
        if (!kent_recorder_counts(r, i)) continue;
        const kent_seen *seen = &r->slots[i].seen[fitting];
        const double head = whole ? seen->highest : seen->highest_head[port];
        kent_press_take(
            m, most,
            (kent_press){
                .kind = kent_press_kind_of(&m->scenarios[m->marches[i].scenario]),
                .pressure = kent_model_pressure(m, head, m->fittings[fitting].at.z),
                .time = whole ? seen->frame_highest.time : seen->highest_at[port],
                .march = m->marches[i]});
    }
}

kent_press kent_press_most(const kent_recorder *r, const kent_site_test *test,
                           size_t fitting, size_t port, bool whole, bool in_full)
{
    const kent_march none = {-1, -1};
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[fitting];
    const kent_port *leg = &m->ports[f->port_first + port];
    kent_press most = {KENT_CASE_TEST, false,  kent_press_of_test(m, test, f), NAN,
                       none,           in_full};

    kent_press_take(m, &most,
                    (kent_press){KENT_CASE_STATIC, false, kent_press_static(m, f), NAN,
                                 none, false});
    kent_press_take(
        m, &most,
        (kent_press){KENT_CASE_SHUT_OFF, false,
                     kent_model_pressure(m, kent_shut_off_level(m, leg->span), f->at.z),
                     NAN, none, false});
    for (size_t s = 0; s < m->state_count; s++) {
        const double head =
            kent_steady_head(m, r->steadies[s], leg->span, leg->chainage);
        kent_press_take(m, &most,
                        (kent_press){KENT_CASE_STEADY,
                                     false,
                                     kent_model_pressure(m, head, f->at.z),
                                     NAN,
                                     {-1, (int)s},
                                     false});
    }
    kent_press_take(
        m, &most,
        (kent_press){KENT_CASE_STATIC, true, kent_press_later(m, f), NAN, none, false});
    press_take_marches(r, fitting, port, whole, &most);
    return most;
}
