/* Ratings: which one each case is held against, where along the pipe, and what is said.
 * Pressures by hand, from rho g = 9806.65 N/m3. */
#include "kent_build.h"
#include "kent_check.h"
#include "kent_job.h"

#include <stdio.h>
#include <string.h>

static const double UNIT_WEIGHT = 9806.65; /* N/m3 */

/* 1 km from a tank at 60 m over a low point D (20 m) to E (25 m), where a valve
 * discharges at 40 m; shut in 8 s, with no vapour. D lies between the ends of the one
 * pipe. */
static kent_build sagging_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 30.0);
    kent_build_point(&b, "D", 600.0, 0.0, 20.0);
    kent_build_point(&b, "E", 1000.0, 0.0, 25.0);
    const int p = kent_build_pipe(&b, "A", "R D E", 0.5, 1000.0);
    (void)snprintf(b.model->pipes[p].standard, sizeof b.model->pipes[p].standard,
                   "EN 545:2010");
    kent_build_fixed_level(&b, "R", 60.0);
    const int valve = kent_build_valve(&b, "V", "E", 0.05, 40.0);
    kent_build_ramp(&b, kent_build_scenario(&b, "shut", 25.0), KENT_EVENT_VALVE, valve,
                    0.5, 8.0, 0.0);
    b.model->solver.grid_check = false;
    for (int i = 1; i <= 2; i++) { /* blocks are no matter here */
        const int note = kent_build_note(&b, b.model->points[i].id);
        b.model->notes[note].restraint = KENT_NO_RESTRAINT;
    }
    return b;
}

static kent_results *run(kent_build *b)
{
    kent_error err = {0};
    kent_results *r = NULL;
    kent_build_derive(b);
    if (kent_job_run(b->model, &(kent_job_options){.threads = 1}, &r, &err)) {
        fail_msg("%s: %s", err.where, err.what);
    }
    return r;
}

/* The caution that holds these words; NULL: none does. */
static const char *caution(const kent_results *r, const char *words)
{
    for (size_t i = 0; i < r->cautions.count; i++) {
        if (strstr(r->cautions.text[i], words)) return r->cautions.text[i];
    }
    return NULL;
}

/* EN 805:2000, 11.3.2: 100 kPa over the highest pressure, surge included, and that is
 * at M, 2 m below the ends of a main that turns by too little there to need a fitting.
 */
static void the_computed_surge_is_looked_for_along_the_main(void **state)
{
    (void)state;
    kent_build b = sagging_main();
    const kent_vec3 at[] = {{0.0, 0.0, 24.0}, {500.0, 0.0, 22.0}, {1000.0, 0.0, 24.0}};
    for (int i = 0; i < 3; i++) {
        b.model->points[i].at = at[i];
    }
    b.model->note_count = 0;
    b.model->valves[0].capacity = 3e-4; /* a slight surge */
    b.model->loads.test_rule = KENT_TEST_EN805_CALCULATED;
    b.model->loads.test_gauge = 1;
    kent_results *r = run(&b);
    const kent_peak *peaks = r->scenarios[0].points;
    const double low = UNIT_WEIGHT * (peaks[1].highest_head - 22.0);
    assert_int_equal(b.model->fitting_count, 1);
    assert_true(low > UNIT_WEIGHT * (peaks[2].highest_head - 24.0) + 1e3);
    assert_close(r->loads->test.pressure, low + 100e3, 1e-9);
    assert_int_equal(r->loads->test.design.point, 1);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* 40 m of still water over D: 3.92 bar. */
static void still_water_is_held_against_the_rating_in_service(void **state)
{
    (void)state;
    for (int over = 0; over < 2; over++) {
        kent_build b = sagging_main();
        kent_pipe *p = &b.model->pipes[0];
        p->pressure_rating = (over ? 0.999 : 1.001) * 40.0 * UNIT_WEIGHT;
        p->surge_rating = p->test_rating = 1e9;
        kent_results *r = run(&b);
        const char *said = caution(r, "in static");
        assert_int_equal(said != NULL, over);
        assert_int_equal(r->limit_exceeded, over);
        if (said) {
            assert_string_equal(said, "pipe A: 3.92 bar reached at D in static, rated "
                                      "3.92 bar (EN 545:2010)");
        }
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* Half of a rating is left by the warmth: 8.0 bar serve 40 m of water, 7.8 do not. */
static void a_warm_plastic_keeps_a_share_of_its_rating(void **state)
{
    (void)state;
    for (int over = 0; over < 2; over++) {
        kent_build b = sagging_main();
        kent_pipe *p = &b.model->pipes[0];
        p->derating = 0.5;
        p->pressure_rating = over ? 7.8e5 : 8.0e5;
        p->surge_rating = p->test_rating = 1e9;
        kent_results *r = run(&b);
        assert_int_equal(caution(r, "rated 3.90 bar, with the share of 0.50 that its "
                                    "temperature leaves (EN 545:2010)") != NULL,
                         over);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* 50 L/s pumped in at E flow to the tank: there is more pressure than at rest by the
 * friction, f L/D V2/2g. The state "idle" has no such flow and is not named. */
static void steady_flow_is_held_against_it_in_every_state(void **state)
{
    (void)state;
    for (int over = 0; over < 2; over++) {
        kent_build b = kent_build_new();
        kent_build_point(&b, "R", 0.0, 0.0, 30.0);
        kent_build_point(&b, "E", 1000.0, 0.0, 20.0);
        kent_build_pipe(&b, "A", "R E", 0.2, 1000.0);
        kent_pipe *p = &b.model->pipes[0];
        p->friction = KENT_DARCY_FIXED;
        p->friction_coefficient = 0.02;
        p->length = 1000.0;
        const double v = 0.05 / (0.01 * acos(-1.0)); /* m/s */
        const double head = 60.0 + 0.02 * 1000.0 / 0.2 * v * v / (2.0 * 9.80665);
        p->pressure_rating = (over ? 0.9999 : 1.0001) * (head - 20.0) * UNIT_WEIGHT;
        kent_build_fixed_level(&b, "R", 60.0);
        kent_build_outflow(&b, "E", -0.05);
        kent_build_state(&b, "idle");
        b.model->states[0].outflow_factor = 0.0;
        kent_build_state(&b, "pumped");
        kent_results *r = run(&b);
        assert_int_equal(caution(r, "reached at E in steady (pumped), rated") != NULL,
                         over);
        assert_null(caution(r, "steady (idle)"));
        assert_null(caution(r, "in static"));
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* Above the rating in service, which still water and steady flow keep. */
static void a_scenario_is_held_against_the_rating_with_surge(void **state)
{
    (void)state;
    kent_build b = sagging_main();
    b.model->pipes[0].pressure_rating = 4e5;
    kent_results *r = run(&b);
    const double peak = kent_model_pressure(
        b.model, r->scenarios[0].points[1].highest_head, 20.0); /* at D */
    assert_true(peak > 4.5e5);
    const char *said = caution(r, "in shut, rated 4.00 bar (EN 545:2010)");
    assert_non_null(said);
    assert_null(caution(r, "in steady"));
    kent_results_free(r);

    b.model->pipes[0].surge_rating = 2.0 * peak;
    r = run(&b);
    assert_null(caution(r, "in shut"));
    assert_false(r->limit_exceeded);
    kent_results_free(r);

    b.model->pipes[0].surge_rating = 0.9 * peak;
    r = run(&b);
    assert_non_null(caution(r, "bar with surge (EN 545:2010)"));
    assert_true(r->limit_exceeded);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* What is marched to be set beside another decides nothing. */
static void a_scenario_for_comparison_decides_no_limit_and_no_load_case(void **state)
{
    (void)state;
    for (int aside = 0; aside < 2; aside++) {
        kent_build b = sagging_main();
        b.model->pipes[0].surge_rating = 4.5e5;
        b.model->loads.test_rule = KENT_TEST_EN805_CALCULATED;
        b.model->loads.test_gauge = 0;
        b.model->scenarios[0].for_comparison = aside == 1;
        kent_results *r = run(&b);
        size_t named = 0;
        for (size_t f = 0; f < r->loads->fitting_count; f++) {
            const kent_fitting_loads *l = &r->loads->fittings[f];
            for (size_t k = 0; k < l->count; k++) {
                named += l->cases[k].scenario == 0;
            }
        }
        assert_int_equal(r->scenario_count, 1); /* it is marched all the same */
        assert_int_equal(named > 0, aside == 0);
        assert_int_equal(caution(r, "in shut, rated") != NULL, aside == 0);
        assert_int_equal(r->limit_exceeded, aside == 0);
        assert_int_equal(strcmp(r->loads->test.design.when, "shut") == 0, aside == 0);
        assert_false(r->loads->test.partial);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* A surge that happens every day tires the pipe: what it is rated for now and then does
 * not serve. Without a rating of its own it is held as any surge. */
static void a_scenario_that_recurs_is_held_against_its_own_rating(void **state)
{
    (void)state;
    kent_build b = sagging_main();
    kent_pipe *p = &b.model->pipes[0];
    p->pressure_rating = 4e5;
    p->surge_rating = 1e9;
    p->recurring_rating = 4.2e5;
    kent_results *r = run(&b);
    assert_false(r->limit_exceeded); /* it happens now and then */
    kent_results_free(r);

    b.model->scenarios[0].class_of = KENT_RECURRING;
    r = run(&b);
    assert_non_null(
        caution(r, "in shut, rated 4.20 bar with surge that recurs (EN 545:2010)"));
    assert_true(r->limit_exceeded);
    kent_results_free(r);

    p->derating = 0.99;
    r = run(&b);
    assert_non_null(caution(r, "in shut, rated 4.16 bar with surge that recurs"));
    kent_results_free(r);

    p->recurring_rating = NAN;
    p->derating = 1.0;
    r = run(&b);
    assert_false(r->limit_exceeded);
    kent_results_free(r);
    p->surge_rating = 4.1e5;
    r = run(&b);
    assert_non_null(caution(r, "in shut, rated 4.10 bar with surge (EN 545:2010)"));
    kent_results_free(r);
    kent_build_clear(&b);
}

/* 6 bar at R are 6 bar and 10 m of water, 6.98 bar, at D. */
static void the_test_is_held_against_its_own_rating_by_elevation(void **state)
{
    (void)state;
    const double at_low_point = 6e5 + 10.0 * UNIT_WEIGHT;
    for (int over = 0; over < 2; over++) {
        kent_build b = sagging_main();
        kent_pipe *p = &b.model->pipes[0];
        p->pressure_rating = p->surge_rating = 1e9;
        p->test_rating = (over ? 0.9999 : 1.0001) * at_low_point;
        b.model->loads.test_pressure = 6e5;
        b.model->loads.test_gauge = 0;
        kent_results *r = run(&b);
        assert_int_equal(caution(r, "6.98 bar reached at D in test, rated 6.98 bar "
                                    "under test (EN 545:2010)") != NULL,
                         over);
        assert_null(caution(r, "test rating is known"));
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

static void a_pipe_without_a_rating_is_named(void **state)
{
    (void)state;
    kent_build b = sagging_main();
    b.model->loads.test_pressure = 6e5;
    kent_results *r = run(&b);
    assert_non_null(caution(r, "no pressure rating is known of pipe A: what the main "
                               "reaches there is held against none"));
    assert_non_null(caution(r, "no test rating is known of pipe A: the test pressure "
                               "there is held against none"));
    assert_false(r->limit_exceeded);
    kent_results_free(r);

    b.model->loads.test_pressure = (double)NAN; /* no test: nothing to hold */
    b.model->pipes[0].pressure_rating = 1e9;
    r = run(&b);
    assert_null(caution(r, "is known"));
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Ten pipes in a row on one level, all too weak: six by name, four by number. */
static void many_weak_pipes_are_counted(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    char id[16], route[16];
    for (int i = 0; i <= 10; i++) {
        (void)snprintf(id, sizeof id, "P%d", i);
        kent_build_point(&b, id, 100.0 * i, 0.0, 0.0);
    }
    for (int i = 0; i < 10; i++) {
        (void)snprintf(id, sizeof id, "A%d", i);
        (void)snprintf(route, sizeof route, "P%d P%d", i, i + 1);
        kent_build_pipe(&b, id, route, 0.3, 1000.0);
        b.model->pipes[i].pressure_rating = 1e5;
    }
    kent_build_fixed_level(&b, "P0", 40.0);
    kent_results *r = run(&b);
    size_t named = 0;
    for (size_t i = 0; i < r->cautions.count; i++) {
        named += strstr(r->cautions.text[i], "in static, rated 1.00 bar") != NULL;
    }
    assert_int_equal(named, 6);
    assert_non_null(caution(r, "4 more pipes pass their ratings in static"));
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Warm plastic loses the same share of every rating (AWWA C900: PVC at 90 degF keeps
 * 0.75; from memory). */
static void every_rating_is_lessened_by_the_share_of_a_warm_pipe(void **state)
{
    (void)state;
    const kent_pipe p = {.pressure_rating = 10e5,
                         .recurring_rating = 12e5,
                         .surge_rating = 16e5,
                         .test_rating = 20e5,
                         .derating = 0.75};
    assert_close(kent_pipe_rating(&p, KENT_RATING_SERVICE), 7.5e5, 1e-15);
    assert_close(kent_pipe_rating(&p, KENT_RATING_RECURRING), 9.0e5, 1e-15);
    assert_close(kent_pipe_rating(&p, KENT_RATING_SURGE), 12.0e5, 1e-15);
    assert_close(kent_pipe_rating(&p, KENT_RATING_TEST), 15.0e5, 1e-15);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_rating_is_lessened_by_the_share_of_a_warm_pipe),
        cmocka_unit_test(the_computed_surge_is_looked_for_along_the_main),
        cmocka_unit_test(still_water_is_held_against_the_rating_in_service),
        cmocka_unit_test(a_warm_plastic_keeps_a_share_of_its_rating),
        cmocka_unit_test(steady_flow_is_held_against_it_in_every_state),
        cmocka_unit_test(a_scenario_is_held_against_the_rating_with_surge),
        cmocka_unit_test(a_scenario_for_comparison_decides_no_limit_and_no_load_case),
        cmocka_unit_test(a_scenario_that_recurs_is_held_against_its_own_rating),
        cmocka_unit_test(the_test_is_held_against_its_own_rating_by_elevation),
        cmocka_unit_test(a_pipe_without_a_rating_is_named),
        cmocka_unit_test(many_weak_pipes_are_counted),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
