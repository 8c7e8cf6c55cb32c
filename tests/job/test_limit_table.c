/* What is asked of each case, row by row. Pressures by hand, from rho g = 9806.65 N/m3.
 */
#include "kent_build.h"
#include "kent_check.h"
#include "kent_job.h"
#include "kent_limit_table.h"

#include <stdio.h>
#include <string.h>

static const double UNIT_WEIGHT = 9806.65; /* N/m3 */

/* 1 km from a tank at 60 m over a low point D (20 m) to E (25 m), where a valve
 * discharges at 40 m; shut in 8 s. */
static kent_build sagging_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 30.0);
    kent_build_point(&b, "D", 600.0, 0.0, 20.0);
    kent_build_point(&b, "E", 1000.0, 0.0, 25.0);
    kent_build_pipe(&b, "A", "R D E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", 60.0);
    const int valve = kent_build_valve(&b, "V", "E", 0.05, 40.0);
    kent_build_ramp(&b, kent_build_scenario(&b, "shut", 25.0), KENT_EVENT_VALVE, valve,
                    0.5, 8.0, 0.0);
    b.model->solver.grid_check = false;
    b.model->pipes[0].pressure_rating = 1e9;
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

static const kent_limit *row(const kent_results *r, kent_limit_kind kind,
                             const char *when)
{
    for (size_t i = 0; i < r->limit_count; i++) {
        const kent_limit *l = &r->limits[i];
        if (l->kind == kind && strcmp(l->when.s, when) == 0) return l;
    }
    return NULL;
}

static bool cautioned(const kent_results *r, const char *words)
{
    for (size_t i = 0; i < r->cautions.count; i++) {
        if (strstr(r->cautions.text[i], words)) return true;
    }
    return false;
}

/* With place and time, and the pressure of that point at that instant. */
static void a_peak_has_its_place_and_its_time(void **state)
{
    (void)state;
    kent_build b = sagging_main();
    kent_results *r = run(&b);
    const kent_limit *l = row(r, KENT_LIMIT_PIPE, "shut");
    const kent_peak *peak = &r->scenarios[0].points[2]; /* at the valve */
    assert_non_null(l);
    assert_int_equal(l->point, 2);
    assert_close(l->reached, UNIT_WEIGHT * (peak->highest_head - 25.0), 1e-9);
    assert_close(l->time, peak->highest_at, 1e-12);
    assert_close(l->asked, 1e9, 1e-12);
    assert_int_equal(l->rating, KENT_RATING_SURGE);
    assert_false(l->exceeded);
    l = row(r, KENT_LIMIT_PIPE, "static");
    assert_close(l->reached, 40.0 * UNIT_WEIGHT, 1e-12);
    assert_true(isnan(l->time));
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Still water at R stands 30 m high, and steady flow leaves that there: the friction
 * has nothing to say, and the lowest place is that of the highest ground. */
static void the_lowest_pressure_is_held_by_class(void **state)
{
    (void)state;
    for (int over = 0; over < 2; over++) {
        kent_build b = sagging_main();
        b.model->asked.lowest[KENT_OCCASIONAL] = over ? 1e6 : -1e5;
        b.model->asked.lowest[KENT_RECURRING] = 1e7; /* of another class */
        kent_results *r = run(&b);
        const kent_limit *l = row(r, KENT_LIMIT_LOWEST, "shut");
        assert_non_null(l);
        assert_close(l->asked, over ? 1e6 : -1e5, 1e-15);
        assert_int_equal(l->exceeded, over);
        assert_int_equal(r->limit_exceeded, over);
        assert_int_equal(cautioned(r, "in shut, asked at least 10.00 bar"), over);
        const kent_limit *steady = row(r, KENT_LIMIT_LOWEST, "steady");
        assert_true(
            isnan(steady->asked)); /* nobody asks, and it is told all the same */
        assert_true(isfinite(steady->reached));
        assert_false(steady->exceeded);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

static void steady_flow_has_a_lowest_of_its_own(void **state)
{
    (void)state;
    kent_build b = sagging_main();
    b.model->asked.lowest_steady = 3e5;
    kent_results *r = run(&b);
    const kent_limit *l = row(r, KENT_LIMIT_LOWEST, "steady");
    assert_true(l->exceeded && r->limit_exceeded);
    assert_false(row(r, KENT_LIMIT_LOWEST, "shut")->exceeded);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* 4 bar of still water at D. */
static void joints_have_a_rating_of_their_own(void **state)
{
    (void)state;
    for (int over = 0; over < 2; over++) {
        kent_build b = sagging_main();
        b.model->pipes[0].joint_rating = (over ? 0.99 : 1.01) * 40.0 * UNIT_WEIGHT;
        b.model->scenarios[0].for_comparison = true; /* its peak is no matter */
        kent_results *r = run(&b);
        assert_int_equal(row(r, KENT_LIMIT_JOINT, "static")->exceeded, over);
        assert_int_equal(r->limit_exceeded, over);
        assert_int_equal(
            cautioned(r, "joints of pipe A: 3.92 bar reached at D in static"), over);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* 90 m at no flow on 10 m, over the low point D at 20 m: 80 m, where 60 m stand still.
 */
static void pipes_are_held_against_pumps_at_no_flow(void **state)
{
    (void)state;
    for (int over = 0; over < 2; over++) {
        kent_build b = sagging_main();
        kent_build_point(&b, "P", -100.0, 0.0, 30.0);
        kent_build_point(&b, "Q", -50.0, 500.0, 20.0);
        kent_build_point(&b, "S", -50.0, 900.0, 30.0);
        kent_build_pipe(&b, "B", "P Q S", 0.5, 1000.0);
        kent_build_fixed_level(&b, "S", 60.0);
        const int p = kent_build_pump(&b, "PS", "P", NULL, 90.0, 0.1, 70.0);
        b.model->pumps[p].suction_level = 10.0;
        b.model->pumps[p].check_valve = KENT_CHECK_IDEAL;
        b.model->pipes[1].pressure_rating = (over ? 0.99 : 1.01) * 80.0 * UNIT_WEIGHT;
        b.model->scenarios[0].for_comparison = true;
        kent_results *r = run(&b);
        const kent_limit *l = row(r, KENT_LIMIT_PIPE, "shut-off");
        assert_non_null(l);
        assert_int_equal(l->pipe, 1); /* no pump reaches A */
        assert_close(l->reached, 80.0 * UNIT_WEIGHT, 1e-9);
        assert_int_equal(l->exceeded, over);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* In service by its rating, with surge by that with surge, under test by that. */
static void a_fitting_is_held_against_its_own_parts(void **state)
{
    (void)state;
    kent_build b = sagging_main();
    kent_fitting_note *n = &b.model->notes[0]; /* at D */
    n->rating = 39.0 * UNIT_WEIGHT;
    n->surge_rating = 1e8;
    n->test_rating = 6.9e5;
    (void)snprintf(n->standard, sizeof n->standard, "EN 1092-2, PN 4");
    b.model->loads.test_pressure = 6e5;
    b.model->loads.test_gauge = 0;
    kent_results *r = run(&b);
    assert_true(row(r, KENT_LIMIT_FITTING, "static")->exceeded);
    assert_true(cautioned(r, "fitting D: 3.92 bar reached in static, rated 3.82 bar "
                             "(EN 1092-2, PN 4)"));
    const kent_limit *l = row(r, KENT_LIMIT_FITTING, "shut");
    assert_false(l->exceeded);
    assert_close(l->asked, 1e8, 1e-15);
    assert_close(l->time, r->scenarios[0].points[1].highest_at, 1e-12);
    l = row(r, KENT_LIMIT_FITTING, "test"); /* 6 bar and 10 m of water */
    assert_close(l->reached, 6e5 + 10.0 * UNIT_WEIGHT, 1e-12);
    assert_true(l->exceeded);
    kent_results_free(r);

    b.model->notes[0].rating = b.model->notes[0].test_rating = 1e8;
    r = run(&b);
    assert_false(r->limit_exceeded);
    kent_results_free(r);
    kent_build_clear(&b);
}

static void a_test_without_a_gauge_is_the_same_everywhere(void **state)
{
    (void)state;
    kent_build b = sagging_main();
    b.model->notes[0].rating = b.model->notes[0].surge_rating = 1e8;
    b.model->notes[0].test_rating = 5.9e5;
    b.model->loads.test_pressure = 6e5;
    kent_results *r = run(&b);
    const kent_limit *l = row(r, KENT_LIMIT_FITTING, "test");
    assert_close(l->reached, 6e5, 1e-15);
    assert_true(l->exceeded);
    assert_close(row(r, KENT_LIMIT_PIPE, "test")->reached, 6e5, 1e-15);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* A bend without a network, 10 bar at one port and 11 at the other. */
static void a_fitting_without_a_network_is_held_by_its_ports(void **state)
{
    (void)state;
    for (int over = 0; over < 2; over++) {
        kent_build b = kent_build_new();
        const kent_port ports[] = {
            kent_build_port((kent_vec3){1.0, 0.0, 0.0}, 10e5, 0.0, 0.3),
            kent_build_port((kent_vec3){0.0, 1.0, 0.0}, 11e5, 0.0, 0.3)};
        const int note = kent_build_ports(&b, "B", -1, ports, 2);
        b.model->notes[note].restraint = KENT_NO_RESTRAINT;
        b.model->notes[note].rating = over ? 10.5e5 : 11.5e5;
        kent_results *r = run(&b);
        const kent_limit *l = row(r, KENT_LIMIT_FITTING, "given");
        assert_non_null(l);
        assert_close(l->reached, 11e5, 1e-15);
        assert_int_equal(l->exceeded, over);
        assert_int_equal(r->limit_exceeded, over);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* A polyethylene wall of 1/61 of its outside diameter: 2 x 8e8/(1 - 0.2025)/60^3 = 9.29
 * kPa. 2 m of ground water over its centre press 19.6 kPa where R has 4.9 kPa inside.
 */
static void a_thin_pipe_is_held_as_a_ring(void **state)
{
    (void)state;
    for (int wet = 0; wet < 2; wet++) {
        kent_build b = sagging_main();
        kent_pipe *p = &b.model->pipes[0];
        p->outside_diameter = 0.61;
        p->wall = p->wall_minimum = 0.01;
        p->inside_diameter = 0.59;
        p->modulus = 8e8;
        p->poisson = 0.45;
        b.model->rules.water_unit_weight = UNIT_WEIGHT;
        b.model->fixed_levels[0].level = 30.5;
        b.model->valves[0].discharge_level = 30.4; /* hardly any flow */
        b.model->ground.cover = 2.0;
        b.model->ground.water_table = wet ? 2.0 + 0.305 - 2.0 : INFINITY;
        kent_results *r = run(&b);
        const kent_limit *l = row(r, KENT_LIMIT_COLLAPSE, "steady");
        assert_non_null(l);
        assert_close(l->asked, 2.0 * 8e8 / (1.0 - 0.2025) / 216000.0, 1e-12);
        assert_int_equal(l->point, 0);
        assert_within(l->reached, (wet ? 2.0 - 0.5 : -0.5) * UNIT_WEIGHT, 60.0);
        assert_int_equal(l->exceeded, wet);
        assert_int_equal(
            cautioned(r, "from outside, an unsupported ring of its wall buckles at "
                         "0.09 bar"),
            wet);
        kent_results_free(r);

        b.model->pipes[0].modulus = 1.7e11; /* far from thin */
        r = run(&b);
        assert_null(row(r, KENT_LIMIT_COLLAPSE, "steady"));
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* The row is there and says so; it decides nothing. */
static void what_is_for_comparison_is_told_and_decides_nothing(void **state)
{
    (void)state;
    for (int aside = 0; aside < 2; aside++) {
        kent_build b = sagging_main();
        b.model->pipes[0].surge_rating = 4.2e5;
        b.model->asked.lowest[KENT_OCCASIONAL] = 1e6;
        b.model->notes[0].rating = 1e9;
        b.model->notes[0].surge_rating = 1e5;
        b.model->scenarios[0].for_comparison = aside == 1;
        kent_results *r = run(&b);
        const kent_limit_kind kinds[] = {KENT_LIMIT_PIPE, KENT_LIMIT_FITTING,
                                         KENT_LIMIT_LOWEST};
        for (int k = 0; k < 3; k++) {
            const kent_limit *l = row(r, kinds[k], "shut");
            assert_true(l->exceeded);
            assert_int_equal(l->for_comparison, aside);
        }
        assert_int_equal(r->limit_exceeded, aside == 0);
        assert_int_equal(cautioned(r, "in shut, rated"), aside == 0);
        assert_int_equal(cautioned(r, "in shut, asked at least"), aside == 0);
        assert_int_equal(cautioned(r, "shut is for comparison: it decides"), aside);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* A valve in line that is shut parts 30 m of head from 5 m: each pipe has its own. */
static void pipes_on_either_side_of_a_valve_have_their_own(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "V", 500.0, 0.0, 0.0);
    kent_build_point(&b, "S", 1000.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R V", 0.3, 1000.0);
    kent_build_pipe(&b, "B", "V S", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 30.0);
    kent_build_fixed_level(&b, "S", 5.0);
    kent_build_valve(&b, "V1", "V", 0.1, (double)NAN);
    b.model->valves[0].opening = 0.0;
    kent_build_scenario(&b, "idle", 5.0);
    b.model->solver.grid_check = false;
    const int note = kent_build_note(&b, "V");
    b.model->notes[note].restraint = KENT_NO_RESTRAINT;
    kent_results *r = run(&b);
    for (size_t i = 0; i < r->limit_count; i++) {
        const kent_limit *l = &r->limits[i];
        if (strcmp(l->when.s, "idle") != 0 || l->pipe < 0) continue;
        assert_close(l->reached, (l->pipe == 0 ? 30.0 : 5.0) * UNIT_WEIGHT, 1e-9);
    }
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Water boils at its vapour pressure less the barometric one, gauge. */
static void the_vapour_limit_is_a_distance(void **state)
{
    (void)state;
    kent_build b = sagging_main();
    kent_results *r = run(&b);
    const kent_limit *l = row(r, KENT_LIMIT_VAPOUR, "shut");
    assert_close(l->asked, b.model->water.vapour_pressure - b.model->barometric, 1e-15);
    assert_close(kent_limit_margin(l), l->reached - l->asked, 1e-15);
    assert_true(kent_limit_margin(l) > 0.0);
    assert_false(l->exceeded);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* A stop in 0.1 s throws 160 m and more to either side of 30 m of still water: the
 * water parts, and the row says so although the pressure stays at the limit. */
static void parted_water_passes_the_vapour_limit(void **state)
{
    (void)state;
    for (int aside = 0; aside < 2; aside++) {
        kent_build b = kent_build_new();
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "E", 1000.0, 0.0, 0.0);
        kent_build_pipe(&b, "A", "R E", 0.3, 1000.0);
        b.model->pipes[0].pressure_rating = 1e9;
        kent_build_fixed_level(&b, "R", 30.0);
        kent_build_outflow(&b, "E", 0.12);
        kent_build_ramp(&b, kent_build_scenario(&b, "stop", 8.0), KENT_EVENT_OUTFLOW, 0,
                        0.5, 0.1, 0.0);
        b.model->solver.column_separation = KENT_SEPARATION_GAS;
        b.model->solver.grid_check = false;
        b.model->scenarios[0].for_comparison = aside == 1;
        kent_results *r = run(&b);
        assert_true(r->scenarios[0].cavity_count > 0);
        const kent_limit *l = row(r, KENT_LIMIT_VAPOUR, "stop");
        assert_true(l->exceeded);
        assert_int_equal(l->for_comparison, aside);
        assert_int_equal(r->limit_exceeded, aside == 0);
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

static void every_kind_has_a_word_of_its_own(void **state)
{
    (void)state;
    for (int a = 0; a < KENT_LIMIT_KINDS; a++) {
        assert_true(strlen(kent_limit_word((kent_limit_kind)a)) > 0);
        for (int b = 0; b < a; b++) {
            assert_string_not_equal(kent_limit_word((kent_limit_kind)a),
                                    kent_limit_word((kent_limit_kind)b));
        }
    }
    assert_string_equal(kent_limit_word(KENT_LIMIT_KINDS), "");
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_peak_has_its_place_and_its_time),
        cmocka_unit_test(the_lowest_pressure_is_held_by_class),
        cmocka_unit_test(steady_flow_has_a_lowest_of_its_own),
        cmocka_unit_test(joints_have_a_rating_of_their_own),
        cmocka_unit_test(pipes_are_held_against_pumps_at_no_flow),
        cmocka_unit_test(a_fitting_is_held_against_its_own_parts),
        cmocka_unit_test(a_test_without_a_gauge_is_the_same_everywhere),
        cmocka_unit_test(a_fitting_without_a_network_is_held_by_its_ports),
        cmocka_unit_test(a_thin_pipe_is_held_as_a_ring),
        cmocka_unit_test(what_is_for_comparison_is_told_and_decides_nothing),
        cmocka_unit_test(pipes_on_either_side_of_a_valve_have_their_own),
        cmocka_unit_test(the_vapour_limit_is_a_distance),
        cmocka_unit_test(parted_water_passes_the_vapour_limit),
        cmocka_unit_test(every_kind_has_a_word_of_its_own),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
