#include "kent_check.h"
#include "kent_mixed.h"
#include "kent_pressures.h"

#include <math.h>
#include <stdio.h>

static void the_highest_is_that_of_the_scenario_named(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_model *m = mixed.build.model;
    size_t looked = 0;
    for (size_t f = 0; f < m->fitting_count; f++) {
        const kent_pressures p = kent_pressures_of(mixed.results, f);
        const int point = m->fittings[f].point;
        if (point < 0) continue;
        looked++;
        for (size_t s = 0; s < mixed.results->scenario_count; s++) {
            const double here = kent_model_pressure(
                m, mixed.results->scenarios[s].points[point].highest_head,
                m->fittings[f].at.z);
            assert_true(here <= p.at[KENT_PRESSURE_HIGHEST]);
            if ((int)s == p.highest_in) {
                assert_true(here == p.at[KENT_PRESSURE_HIGHEST]);
            }
        }
        assert_true(p.at[KENT_PRESSURE_LOWEST] <= p.at[KENT_PRESSURE_STEADY] + 1.0);
        assert_true(p.at[KENT_PRESSURE_HIGHEST] >= p.at[KENT_PRESSURE_STEADY] - 1.0);
    }
    assert_true(looked >= 8);
    kent_mixed_clear(&mixed);
}

/* Hydrostatics: the test is read at VC, 35 m; pressure falls by rho g with height. */
static void test_pressure_is_carried_by_elevation(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_model *m = mixed.build.model;
    const int crest = kent_build_fitting_of(&mixed.build, "CR");
    const kent_pressures p = kent_pressures_of(mixed.results, (size_t)crest);
    assert_close(p.at[KENT_PRESSURE_TEST],
                 9e5 - m->water.density * m->gravity * (52.0 - 35.0), 1e-12);
    assert_close(p.rating[KENT_RATING_SERVICE], 25e5, 0.0);
    assert_true(isnan(p.rating[KENT_RATING_SURGE]) &&
                isnan(p.rating[KENT_RATING_TEST]));
    kent_mixed_clear(&mixed);
}

/* Of the pipes that meet the least counts; where only one has a rating with surge that
 * of the other in service stands beside it. */
static void ratings_with_surge_are_the_least_of_the_pipes_that_meet(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    kent_model *m = mixed.build.model;
    const size_t crest = (size_t)kent_build_fitting_of(&mixed.build, "CR");
    const kent_port *port = &m->ports[m->fittings[crest].port_first];
    kent_pipe *p = &m->pipes[m->spans[port->span].pipe];
    p->surge_rating = 24e5;
    kent_pressures at = kent_pressures_of(mixed.results, crest);
    assert_close(at.rating[KENT_RATING_SURGE], 24e5, 0.0);
    assert_true(isnan(at.rating[KENT_RATING_RECURRING]) != 0);
    p->recurring_rating = 23e5;
    at = kent_pressures_of(mixed.results, crest);
    assert_close(at.rating[KENT_RATING_SURGE], 24e5, 0.0);
    assert_close(at.rating[KENT_RATING_RECURRING], 23e5, 0.0);
    kent_mixed_clear(&mixed);
}

/* It has the factor of still water, but a column of its own. */
static void a_later_pressure_has_its_own_column(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const size_t crest = (size_t)kent_build_fitting_of(&mixed.build, "CR");
    const int governs = mixed.results->restraints->fittings[crest].governing;
    kent_load_case *c = &mixed.results->loads->fittings[crest].cases[governs];
    assert_true(
        isnan(kent_pressures_of(mixed.results, crest).at[KENT_PRESSURE_FUTURE]));
    (void)snprintf(c->name, sizeof c->name, "future");
    c->later = true;
    c->kind = KENT_CASE_STATIC;
    c->scenario = -1;
    c->worst[KENT_RESULTANT].set = true;
    c->worst[KENT_RESULTANT].pressure = 12e5;
    const kent_pressures p = kent_pressures_of(mixed.results, crest);
    assert_int_equal(p.governs, KENT_PRESSURE_FUTURE);
    assert_close(p.at[KENT_PRESSURE_FUTURE], 12e5, 0.0);
    kent_mixed_clear(&mixed);
}

static void a_fitting_with_ports_of_its_own_has_only_what_was_given(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const int own = kent_build_fitting_of(&mixed.build, "B7");
    const kent_pressures p = kent_pressures_of(mixed.results, (size_t)own);
    assert_true(isfinite(p.at[KENT_PRESSURE_GIVEN]) != 0);
    for (int k = 0; k <= KENT_PRESSURE_LOWEST; k++) {
        assert_true(isnan(p.at[k]) != 0);
    }
    assert_true(isnan(p.rating[KENT_RATING_SERVICE]) != 0);
    kent_mixed_clear(&mixed);
}

static void the_extremes_of_the_main_bound_every_point(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_model *m = mixed.build.model;
    for (size_t s = 0; s < mixed.results->scenario_count; s++) {
        const kent_extreme high = kent_extreme_highest(mixed.results, s);
        const kent_extreme low = kent_extreme_lowest(mixed.results, s);
        assert_true((high.point >= 0) != (high.span >= 0));
        for (size_t i = 0; i < m->point_count; i++) {
            const kent_peak *peak = &mixed.results->scenarios[s].points[i];
            const double z = m->points[i].at.z;
            if (!isfinite(peak->highest_head)) continue;
            assert_true(kent_model_pressure(m, peak->highest_head, z) <= high.pressure);
            assert_true(kent_model_pressure(m, peak->lowest_head, z) >= low.pressure);
        }
    }
    kent_mixed_clear(&mixed);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_highest_is_that_of_the_scenario_named),
        cmocka_unit_test(test_pressure_is_carried_by_elevation),
        cmocka_unit_test(ratings_with_surge_are_the_least_of_the_pipes_that_meet),
        cmocka_unit_test(a_later_pressure_has_its_own_column),
        cmocka_unit_test(a_fitting_with_ports_of_its_own_has_only_what_was_given),
        cmocka_unit_test(the_extremes_of_the_main_bound_every_point),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
