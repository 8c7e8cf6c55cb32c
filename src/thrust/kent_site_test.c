#include "kent_site_test.h"

#include "kent_said.h"

#include <math.h>
#include <stdio.h>

/* AWWA C600, hydrostatic test: on the working pressure at the gauge, and at the main's
 * highest point. */
static const double C600_AT_GAUGE = 1.5, C600_AT_TOP = 1.25;
static const double C600_DIVISOR = 148000.0; /* of the testing allowance */

/* EN 805:2000, 11.3.2: system test pressure over the maximum design pressure. */
static const double EN805_CALCULATED = 100e3;                         /* Pa */
static const double EN805_ASSUMED_RATIO = 1.5, EN805_ASSUMED = 500e3; /* -, Pa */

static const double LEVEL = 0.01; /* m: points this near are at one level */

double kent_site_test_by_factor(double working, double factor)
{
    return factor * working;
}

double kent_site_test_c600(double working, double working_highest, double rise,
                           double unit_weight)
{
    return fmax(C600_AT_GAUGE * working,
                C600_AT_TOP * working_highest + unit_weight * rise);
}

double kent_site_test_en805_calculated(double design)
{
    return design + EN805_CALCULATED;
}

double kent_site_test_en805_assumed(double design)
{
    return fmin(EN805_ASSUMED_RATIO * design, design + EN805_ASSUMED);
}

/* L = S D sqrt(P) / 148 000, in US gallons an hour, ft, in and psi. */
double kent_site_test_allowance(double length, double diameter, double pressure)
{
    const double foot = 0.3048, inch = 0.0254, psi = 6894.757293168361; /* m, m, Pa */
    const double gallon_an_hour = 3.785411784e-3 / 3600.0;              /* m3/s */
    if (!(pressure > 0.0)) return 0.0;
    return length / foot * (diameter / inch) * sqrt(pressure / psi) / C600_DIVISOR *
           gallon_an_hour;
}

double kent_site_test_main_allowance(const kent_model *m, const kent_site_test *t)
{
    double all = 0.0;
    if (!isfinite(t->pressure) || t->gauge < 0) return (double)NAN;
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        const double start = kent_span_level(m, span, 0.0);
        const double end = kent_span_level(m, span, span->length);
        const double fall = m->points[t->gauge].at.z - 0.5 * (start + end);
        const double mean = t->pressure + m->water.density * m->gravity * fall;
        all += kent_site_test_allowance(span->length, span->bore, mean);
    }
    return all;
}

/* ---- what a main works under ----------------------------------------------------- */

static const kent_worst NOWHERE = {(double)NAN, (double)NAN, -1, ""};

static void worst_take(kent_worst *most, kent_worst w)
{
    if (w.pressure > most->pressure || most->point < 0) *most = w;
}

/* The working pressure at one stop of a span; level: of the still water above it. */
static kent_worst working_at(const kent_model *m, kent_steady *const *steadies,
                             int span, size_t stop, double level)
{
    const int point = m->route[stop];
    const double z = m->points[point].at.z;
    const double chainage = m->chainage[stop] - m->chainage[m->spans[span].route_first];
    kent_worst most = {kent_model_pressure(m, level, z), z, point, "static"};

    for (size_t s = 0; s < m->state_count; s++) {
        const double head = kent_steady_head(m, steadies[s], span, chainage);
        worst_take(&most,
                   (kent_worst){kent_model_pressure(m, head, z), z, point, "steady"});
    }
    return most;
}

/* What is expected later, by elevation (9.12). */
static kent_worst future_at(const kent_model *m, int point)
{
    const int gauge = m->loads.future_gauge;
    const double z = m->points[point].at.z;
    const double above = gauge >= 0 ? m->points[gauge].at.z - z : 0.0;

    return (kent_worst){m->loads.future_pressure +
                            m->water.density * m->gravity * above,
                        z, point, "future"};
}

typedef struct survey {
    kent_worst gauge, top, anywhere;
} survey;

static survey survey_main(const kent_model *m, kent_steady *const *steadies)
{
    survey s = {NOWHERE, NOWHERE, NOWHERE};

    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        const double level = kent_static_level(m, span->node[0]);
        for (size_t k = 0; k < span->route_count; k++) {
            const kent_worst here =
                working_at(m, steadies, (int)i, span->route_first + k, level);
            if (here.point == m->loads.test_gauge) worst_take(&s.gauge, here);
            const bool higher = !(here.level <= s.top.level);
            if (higher) s.top = here;
            if (here.point == s.top.point) worst_take(&s.top, here);
            worst_take(&s.anywhere, here);
            if (isnan(m->loads.future_pressure)) continue;
            worst_take(&s.anywhere, future_at(m, here.point));
        }
    }
    return s;
}

int kent_site_test_lowest_point(const kent_model *m)
{
    int lowest = -1;

    for (size_t i = 0; i < m->route_count; i++) {
        const int point = m->route[i];
        if (lowest < 0 || m->points[point].at.z < m->points[lowest].at.z) {
            lowest = point;
        }
    }
    return lowest;
}

/* ---- the test -------------------------------------------------------------------- */

static void find_by_rule(const kent_model *m, const survey *s, const kent_worst *surge,
                         kent_site_test *t)
{
    const double unit_weight = m->water.density * m->gravity;

    switch (t->rule) {
    case KENT_TEST_FIXED:
        t->pressure = m->loads.test_pressure;
        break;
    case KENT_TEST_FACTOR:
        t->at_gauge = s->gauge;
        t->pressure = kent_site_test_by_factor(s->gauge.pressure, m->loads.test_factor);
        break;
    case KENT_TEST_C600:
        t->at_gauge = s->gauge;
        t->at_top = s->top;
        t->pressure = kent_site_test_c600(s->gauge.pressure, s->top.pressure,
                                          s->top.level - s->gauge.level, unit_weight);
        break;
    case KENT_TEST_EN805_ASSUMED:
        t->design = s->anywhere;
        t->pressure = kent_site_test_en805_assumed(s->anywhere.pressure +
                                                   m->loads.surge_allowance);
        break;
    case KENT_TEST_EN805_CALCULATED:
        t->design = s->anywhere;
        if (!surge) break;
        if (surge->point >= 0) worst_take(&t->design, *surge);
        t->pressure = kent_site_test_en805_calculated(t->design.pressure);
        break;
    }
}

kent_site_test kent_site_test_find(const kent_model *m, kent_steady *const *steadies,
                                   const kent_worst *surge)
{
    kent_site_test t = {.rule = m->loads.test_rule,
                        .pressure = (double)NAN,
                        .gauge = m->loads.test_gauge,
                        .at_gauge = NOWHERE,
                        .at_top = NOWHERE,
                        .design = NOWHERE};
    const survey s = t.rule == KENT_TEST_FIXED ? (survey){NOWHERE, NOWHERE, NOWHERE}
                                               : survey_main(m, steadies);

    find_by_rule(m, &s, surge, &t);
    return t;
}

const char *kent_site_test_rule_word(kent_test_rule rule)
{
    switch (rule) {
    case KENT_TEST_EN805_CALCULATED:
        return "EN805-surge-calculated";
    case KENT_TEST_EN805_ASSUMED:
        return "EN805-surge-assumed";
    case KENT_TEST_C600:
        return "C600";
    case KENT_TEST_FACTOR:
        return "working-factor";
    case KENT_TEST_FIXED:
        break;
    }
    return "given";
}

void kent_site_test_caution(const kent_model *m, const kent_site_test *t,
                            kent_notes *cautions)
{
    const int lowest = kent_site_test_lowest_point(m);
    const char *rule = kent_site_test_rule_word(t->rule);

    if (t->rule == KENT_TEST_FIXED || lowest < 0) return;
    if (isnan(t->pressure)) {
        kent_notes_add(
            cautions,
            "test_rule %s: no test pressure could be found, so no fitting is "
            "held against the site test; read it at a point of a pipe's "
            "route",
            rule);
        return;
    }
    if (t->gauge >= 0 && m->points[lowest].at.z < m->points[t->gauge].at.z - LEVEL) {
        kent_notes_add(
            cautions,
            "test_rule %s means a gauge at the lowest point, \"%s\"; read at "
            "\"%s\", %s above it, the lower points are tested at more",
            rule, m->points[lowest].id, m->points[t->gauge].id,
            kent_said_of(KENT_LENGTH, m->units,
                         m->points[t->gauge].at.z - m->points[lowest].at.z)
                .s);
    }
    if (t->partial) {
        kent_notes_add(
            cautions,
            "test_rule %s asks for every scenario, but not all were run: the "
            "test pressure may be too low",
            rule);
    }
}

/* ---- the hand calculation -------------------------------------------------------- */

static void derive_worst(const kent_model *m, kent_derivation *d, const char *symbol,
                         const kent_worst *w, const char *what)
{
    char says[160];
    const char *at = w->point >= 0 ? m->points[w->point].id : "?";

    (void)snprintf(says, sizeof says, "%s: %s, %s", what, at, w->when);
    kent_derivation_put(d, symbol, w->pressure, KENT_PRESSURE, KENT_COMPUTED, says);
}

static void derive_c600(const kent_model *m, const kent_site_test *t,
                        kent_derivation *d)
{
    derive_worst(m, d, "p_w", &t->at_gauge, "working pressure at the gauge");
    derive_worst(m, d, "p_top", &t->at_top, "working pressure at the highest point");
    kent_derivation_put(d, "z_top", t->at_top.level, KENT_LENGTH, KENT_GIVEN,
                        "level of the highest point");
    kent_derivation_work(d, "p_test", t->pressure, KENT_PRESSURE,
                         "max(1.5*p_w,1.25*p_top+rho*g*(z_top-z_gauge))", "9.9",
                         "test pressure at the gauge, AWWA C600");
}

static void derive_calculated(const kent_model *m, const kent_site_test *t,
                              kent_derivation *d)
{
    derive_worst(m, d, "MDP", &t->design, "highest pressure, surge computed");
    kent_derivation_put(d, "p_plus", EN805_CALCULATED, KENT_PRESSURE, KENT_CATALOGUE,
                        "added by EN 805, 11.3.2");
    kent_derivation_work(d, "p_test", t->pressure, KENT_PRESSURE, "MDP+p_plus", "9.10",
                         "test pressure at the gauge, EN 805");
}

static void derive_assumed(const kent_model *m, const kent_site_test *t,
                           kent_derivation *d)
{
    const double design = t->design.pressure + m->loads.surge_allowance;

    derive_worst(m, d, "DP", &t->design, "highest working pressure");
    kent_derivation_put(d, "dp_surge", m->loads.surge_allowance, KENT_PRESSURE,
                        KENT_GIVEN, "allowance for surge");
    kent_derivation_work(d, "MDP", design, KENT_PRESSURE, "DP+dp_surge", "9.11",
                         "maximum design pressure, surge assumed");
    kent_derivation_put(d, "p_plus", EN805_ASSUMED, KENT_PRESSURE, KENT_CATALOGUE,
                        "added at most by EN 805, 11.3.2");
    kent_derivation_work(d, "p_test", t->pressure, KENT_PRESSURE,
                         "min(1.5*MDP,MDP+p_plus)", "9.11",
                         "test pressure at the gauge, EN 805");
}

void kent_site_test_derive(const kent_model *m, const kent_site_test *t,
                           double own_level, kent_derivation *d)
{
    const bool gauged = t->gauge >= 0;

    if (t->rule == KENT_TEST_FIXED) {
        kent_derivation_put(d, "p_test", t->pressure, KENT_PRESSURE, KENT_GIVEN,
                            "field test pressure at the gauge");
    }
    kent_derivation_put(d, "z_gauge", gauged ? m->points[t->gauge].at.z : own_level,
                        KENT_LENGTH, gauged ? KENT_GIVEN : KENT_ASSUMED,
                        "level of the gauge");
    switch (t->rule) {
    case KENT_TEST_FIXED:
        break;
    case KENT_TEST_FACTOR:
        derive_worst(m, d, "p_w", &t->at_gauge, "working pressure at the gauge");
        kent_derivation_put(d, "k_test", m->loads.test_factor, KENT_RATIO, KENT_GIVEN,
                            "factor of the test");
        kent_derivation_work(d, "p_test", t->pressure, KENT_PRESSURE, "k_test*p_w",
                             "9.8", "test pressure at the gauge");
        break;
    case KENT_TEST_C600:
        derive_c600(m, t, d);
        break;
    case KENT_TEST_EN805_CALCULATED:
        derive_calculated(m, t, d);
        break;
    case KENT_TEST_EN805_ASSUMED:
        derive_assumed(m, t, d);
        break;
    }
}
