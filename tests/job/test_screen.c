/* Figures for a hand check: what they are taken from, and where they are the march's
 * own answer, since the main is what they know: one pipe without friction. */
#include "kent_build.h"
#include "kent_check.h"
#include "kent_job.h"
#include "kent_screen.h"
#include "kent_tiring.h"

#include <math.h>
#include <string.h>

static const double LENGTH = 1000.0, SPEED = 1000.0, FLOW = 0.1; /* m, m/s, m3/s */

static double area(double bore) { return 0.25 * acos(-1.0) * bore * bore; }

/* R (60 m) to E, level at 0 m, 0.5 m bore; E draws. */
static kent_build plain_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", LENGTH, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R E", 0.5, SPEED);
    kent_build_fixed_level(&b, "R", 60.0);
    kent_build_outflow(&b, "E", FLOW);
    b.model->solver.grid_check = false;
    b.model->solver.column_separation = KENT_SEPARATION_NONE;
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

static kent_screen only(const kent_results *r)
{
    kent_screen s[2];
    bool failed = false;
    assert_int_equal(kent_screen_of(r, 0, s, 2, &failed), 1);
    assert_false(failed);
    return s[0];
}

/* Joukowsky: what stops before the wave is back gives rho a dV, in the march too. */
static void a_sudden_stop_is_the_marchs_own_answer(void **state)
{
    (void)state;
    kent_build b = plain_main();
    kent_build_ramp(&b, kent_build_scenario(&b, "stop", 10.0), KENT_EVENT_OUTFLOW, 0,
                    1.0, 0.5, 0.0);
    kent_results *r = run(&b);
    const kent_screen s = only(r);
    const double velocity = FLOW / area(0.5);
    assert_close(s.velocity, velocity, 1e-12);
    assert_close(s.sudden, b.model->water.density * SPEED * velocity, 1e-12);
    assert_close(s.per_velocity, b.model->water.density * SPEED, 1e-12);
    assert_close(s.return_time, 2.0 * LENGTH / SPEED, 1e-12);
    assert_int_equal(s.end, KENT_PATH_LEVEL);
    assert_int_equal(s.end_point, 0);
    assert_close(s.time, 0.5, 1e-12);
    assert_true(isnan(s.slow));
    assert_close(s.linear, s.sudden, 1e-15);
    assert_close(s.rise, s.sudden, 1e-6);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Michaud: an even stop over 10 s raises the head for 2L/a and then no more: 2 rho L
 * dV/T, in the march too. */
static void an_even_slow_stop_is_michauds_figure(void **state)
{
    (void)state;
    kent_build b = plain_main();
    kent_build_ramp(&b, kent_build_scenario(&b, "stop", 20.0), KENT_EVENT_OUTFLOW, 0,
                    1.0, 10.0, 0.0);
    kent_results *r = run(&b);
    const kent_screen s = only(r);
    const double velocity = FLOW / area(0.5);
    assert_close(s.slow, 2.0 * b.model->water.density * LENGTH * velocity / 10.0,
                 1e-12);
    assert_close(s.linear, s.slow, 1e-12);
    assert_close(s.rise, s.slow, 1e-5);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* The same stop by a law that does most of it between 4 and 6 s of 10: 80 % in 2 s. The
 * sum of all waves at 6 s, (0.9 - 2 x 0.1 + 2 x 0.05) rho a dV, is 2 rho L dV/T again.
 */
static void a_law_counts_by_its_steep_part(void **state)
{
    (void)state;
    kent_build b = plain_main();
    const kent_law_point law[] = {
        {0.0, FLOW}, {4.0, 0.9 * FLOW}, {6.0, 0.1 * FLOW}, {10.0, 0.0}};
    kent_build_law(&b, kent_build_scenario(&b, "stop", 20.0), KENT_EVENT_OUTFLOW, 0,
                   1.0, law, 4);
    kent_results *r = run(&b);
    const kent_screen s = only(r);
    assert_close(s.time, 2.0 / 0.8, 1e-9);
    assert_close(s.velocity, FLOW / area(0.5), 1e-12);
    assert_close(s.rise, s.slow, 1e-5);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* A valve that discharges passes less and less; its flow is the march's. */
static void a_valve_counts_by_the_flow_that_it_passed(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", LENGTH, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R E", 0.5, SPEED);
    kent_build_fixed_level(&b, "R", 60.0);
    const int v = kent_build_valve(&b, "V", "E", 0.02, 0.0);
    kent_build_ramp(&b, kent_build_scenario(&b, "shut", 30.0), KENT_EVENT_VALVE, v, 1.0,
                    12.0, 0.0);
    b.model->solver.grid_check = false;
    kent_results *r = run(&b);
    const kent_screen s = only(r);
    const double q = r->steadies[0]->valve_flow[0];
    assert_int_equal(s.kind, KENT_EVENT_VALVE);
    assert_close(s.velocity, q / area(0.5), 1e-9);
    assert_true(s.time > 2.0 && s.time < 12.0); /* it throttles near its seat */
    assert_true(s.rise > 0.0 && s.rise <= s.sudden * (1.0 + 1e-9));
    kent_results_free(r);
    kent_build_clear(&b);
}

/* A surge tank half way is where the wave turns, unless the scenario leaves it out. */
static void a_path_ends_at_the_nearest_tank_that_is_there(void **state)
{
    (void)state;
    for (int out = 0; out < 2; out++) {
        kent_build b = kent_build_new();
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "T", 600.0, 0.0, 0.0);
        kent_build_point(&b, "E", LENGTH, 0.0, 0.0);
        kent_build_pipe(&b, "A", "R T E", 0.5, SPEED);
        kent_build_fixed_level(&b, "R", 60.0);
        kent_build_outflow(&b, "E", FLOW);
        kent_build_surge_tank(&b, "ST", "T", 10.0);
        const int s0 = kent_build_scenario(&b, "stop", 10.0);
        kent_build_ramp(&b, s0, KENT_EVENT_OUTFLOW, 0, 1.0, 5.0, 0.0);
        kent_left_out left = {KENT_DEVICE_SURGE_TANK, 0};
        if (out) {
            b.model->without = kent_alloc(1, sizeof left);
            assert_non_null(b.model->without);
            b.model->without[0] = left;
            b.model->without_count = 1;
            b.model->scenarios[s0].without_count = 1;
        }
        b.model->solver.grid_check = false;
        kent_results *r = run(&b);
        const kent_screen s = only(r);
        assert_int_equal(s.end, out ? KENT_PATH_LEVEL : KENT_PATH_TANK);
        assert_close(s.length, out ? LENGTH : 400.0, 1e-12);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* From the end of a branch of 0.2 m to a main of 0.6 m; not of 0.3 m, whose two sides
 * have 2 x 2.25 times its area and so end it too; of 0.2 m they have twice and don't.
 */
static void a_path_ends_at_a_much_larger_junction(void **state)
{
    (void)state;
    const double bores[] = {0.6, 0.3, 0.2};
    for (int i = 0; i < 3; i++) {
        kent_build b = kent_build_new();
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "J", 500.0, 0.0, 0.0);
        kent_build_point(&b, "S", 900.0, 0.0, 0.0);
        kent_build_point(&b, "E", 500.0, 300.0, 0.0);
        kent_build_pipe(&b, "A", "R J S", bores[i], SPEED);
        kent_build_pipe(&b, "B", "J E", 0.2, SPEED);
        kent_build_fixed_level(&b, "R", 60.0);
        kent_build_outflow(&b, "E", 0.01);
        kent_build_ramp(&b, kent_build_scenario(&b, "stop", 5.0), KENT_EVENT_OUTFLOW, 0,
                        1.0, 2.0, 0.0);
        b.model->solver.grid_check = false;
        kent_results *r = run(&b);
        const kent_screen s = only(r);
        assert_int_equal(s.end, i < 2 ? KENT_PATH_JUNCTION : KENT_PATH_LEVEL);
        assert_close(s.length, i < 2 ? 300.0 : 800.0, 1e-12);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* Water pushed in at A reaches R through the valve alone: nothing on its side of the
 * valve holds a level. */
static void without_a_level_nothing_comes_back(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "A", 0.0, 0.0, 0.0);
    kent_build_point(&b, "V", 500.0, 0.0, 0.0);
    kent_build_point(&b, "R", 900.0, 0.0, 0.0);
    kent_build_pipe(&b, "P", "A V", 0.3, SPEED);
    kent_build_pipe(&b, "Q", "V R", 0.3, SPEED);
    kent_build_outflow(&b, "A", -0.02);
    kent_build_fixed_level(&b, "R", 40.0);
    const int v = kent_build_valve(&b, "V1", "V", 0.1, (double)NAN);
    kent_build_ramp(&b, kent_build_scenario(&b, "half", 5.0), KENT_EVENT_VALVE, v, 1.0,
                    2.0, 0.5);
    b.model->solver.grid_check = false;
    kent_results *r = run(&b);
    const kent_screen s = only(r);
    assert_int_equal(s.end, KENT_PATH_NONE);
    assert_int_equal(s.end_point, -1);
    assert_true(isnan(s.return_time) && isnan(s.slow) && isnan(s.linear));
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Its flow falls, so the pressure falls first; a second event of it is not another. */
static void a_pump_counts_once_on_its_delivery(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "PH", 0.0, 0.0, 0.0);
    kent_build_point(&b, "R", LENGTH, 0.0, 10.0);
    kent_build_pipe(&b, "A", "PH R", 0.4, SPEED);
    kent_build_fixed_level(&b, "R", 50.0);
    const int pump = kent_build_pump(&b, "PS", "PH", NULL, 70.0, 0.1, 50.0);
    b.model->pumps[pump].suction_level = 2.0;
    b.model->pumps[pump].check_valve = KENT_CHECK_IDEAL;
    const int s0 = kent_build_scenario(&b, "trip", 20.0);
    kent_build_ramp(&b, s0, KENT_EVENT_PUMP, pump, 1.0, (double)NAN, (double)NAN);
    b.model->solver.grid_check = false;
    kent_results *r = run(&b);
    const kent_screen s = only(r);
    const double q = r->steadies[0]->device_flow[0];
    assert_true(q > 0.05);
    assert_close(s.velocity, -q / area(0.4), 1e-9);
    assert_close(s.return_time, 2.0 * LENGTH / SPEED, 1e-4);
    assert_int_equal(s.point, 0);
    assert_true(s.fall > 0.0);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* A burst and a level have no such figures. */
static void what_has_no_figures_is_left_out(void **state)
{
    (void)state;
    kent_build b = plain_main();
    const kent_law_point law[] = {{0.0, 60.0}, {5.0, 61.0}};
    kent_build_law(&b, kent_build_scenario(&b, "tide", 10.0), KENT_EVENT_FIXED_LEVEL, 0,
                   0.0, law, 2);
    kent_results *r = run(&b);
    kent_screen s[1];
    bool failed = false;
    assert_int_equal(kent_screen_of(r, 0, s, 1, &failed), 0);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* ---- swings ---------------------------------------------------------------------- */

enum { YEAR = 31557600 }; /* s */

/* A sudden stop swings the end by rho a dV to either side of still water: 60 m. */
static void a_plastic_is_swung_where_a_surge_recurs(void **state)
{
    (void)state;
    kent_build b = plain_main();
    kent_build_ramp(&b, kent_build_scenario(&b, "stop", 10.0), KENT_EVENT_OUTFLOW, 0,
                    1.0, 0.5, 0.0);
    kent_scenario *s = &b.model->scenarios[0];
    s->class_of = KENT_RECURRING;
    s->cycles_per_day = 4.0;
    b.model->asked.life = 50.0 * YEAR;
    b.model->pipes[0].plastic = true;
    b.model->pipes[0].pressure_rating = 16e5;
    kent_results *r = run(&b);
    kent_tiring t;
    assert_true(kent_tiring_of(r, 0, 0, &t));
    const double weight = b.model->water.density * b.model->gravity;
    const double swing = b.model->water.density * SPEED * FLOW / area(0.5);
    const double speed_head = 0.5 * b.model->water.density * pow(FLOW / area(0.5), 2);
    assert_within(t.amplitude, swing, 1.1 * speed_head); /* lost on leaving the tank */
    assert_within(t.mean, 60.0 * weight, 1.1 * speed_head);
    assert_close(t.highest - t.lowest, 2.0 * t.amplitude, 1e-12);
    assert_close(t.rating, 16e5, 1e-15);
    assert_close(t.cycles, 4.0 * 365.25 * 50.0, 1e-12);

    s = &b.model->scenarios[0];
    b.model->pipes[0].plastic = false;
    assert_false(kent_tiring_of(r, 0, 0, &t));
    b.model->pipes[0].plastic = true;
    s->class_of = KENT_OCCASIONAL;
    assert_false(kent_tiring_of(r, 0, 0, &t));
    s->class_of = KENT_RECURRING;
    s->for_comparison = true;
    assert_false(kent_tiring_of(r, 0, 0, &t));
    s->for_comparison = false;
    b.model->asked.life = (double)NAN;
    assert_true(kent_tiring_of(r, 0, 0, &t));
    assert_true(isnan(t.cycles));
    kent_results_free(r);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_sudden_stop_is_the_marchs_own_answer),
        cmocka_unit_test(an_even_slow_stop_is_michauds_figure),
        cmocka_unit_test(a_law_counts_by_its_steep_part),
        cmocka_unit_test(a_valve_counts_by_the_flow_that_it_passed),
        cmocka_unit_test(a_path_ends_at_the_nearest_tank_that_is_there),
        cmocka_unit_test(a_path_ends_at_a_much_larger_junction),
        cmocka_unit_test(without_a_level_nothing_comes_back),
        cmocka_unit_test(a_pump_counts_once_on_its_delivery),
        cmocka_unit_test(what_has_no_figures_is_left_out),
        cmocka_unit_test(a_plastic_is_swung_where_a_surge_recurs),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
