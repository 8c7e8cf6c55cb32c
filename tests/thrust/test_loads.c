/* Load cases: which there are, in what order, at which pressure and with which sign. */
#include "kent_check.h"
#include "kent_net.h"

#include <math.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double RHO = 1000.0, G = 9.80665;

static double area(double diameter) { return 0.25 * PI * diameter * diameter; }

/* Flows from R (level 100 m) through an in-line valve at V to an outlet valve at E; at
 * T a dead branch to the north, at X the main narrows. Low point L, high point C. */
static kent_build a_main(void)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 30.0);
    (void)kent_build_point(&b, "V", 200.0, 0.0, 30.0);
    (void)kent_build_point(&b, "C", 500.0, 0.0, 30.0);
    (void)kent_build_point(&b, "L", 700.0, 0.0, 5.0);
    (void)kent_build_point(&b, "T", 900.0, 0.0, 5.0);
    (void)kent_build_point(&b, "D", 900.0, 50.0, 5.0);
    (void)kent_build_point(&b, "X", 1000.0, 0.0, 5.0);
    (void)kent_build_point(&b, "E", 1200.0, 0.0, 5.0);
    (void)kent_build_pipe(&b, "A", "R V", 0.5, 1000.0);
    (void)kent_build_pipe(&b, "B", "V C L T", 0.5, 1000.0);
    (void)kent_build_pipe(&b, "BR", "T D", 0.2, 1000.0);
    (void)kent_build_pipe(&b, "M", "T X", 0.5, 1000.0);
    (void)kent_build_pipe(&b, "N", "X E", 0.4, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    const int inline_valve = kent_build_valve(&b, "VI", "V", 2.0, (double)NAN);
    const int outlet = kent_build_valve(&b, "VE", "E", 0.05, 5.0);
    b.model->valves[inline_valve].size = 0.5;
    b.model->valves[outlet].size = 0.4;
    const int s = kent_build_scenario(&b, "shut", 20.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, outlet, 0.0, 0.0, 0.0);
    b.model->loads.test_pressure = 12e5;
    b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
    return b;
}

/* The same head and flow everywhere at two instants. */
static void take_two(kent_net *n, double first, double second)
{
    static kent_made t;
    t.count = 0;
    kent_made_add(&t, n, 0.0, first, 0.1);
    kent_made_add(&t, n, 0.5, second, 0.0);
    kent_made_take(&t, n, 0, 0.5, 64);
}

static void assert_cases(const kent_net *n, const char *fitting,
                         const char *const *names, size_t count)
{
    const kent_fitting_loads *loads =
        &n->loads->fittings[kent_build_fitting_of(&n->build, fitting)];
    assert_int_equal(loads->count, count);
    for (size_t i = 0; i < count; i++) {
        assert_string_equal(loads->cases[i].name, names[i]);
    }
}

static void cases_stand_in_their_order(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    take_two(&n, 90.0, 110.0);
    kent_net_finish(&n);
    static const char *const BEND[] = {"test", "static", "steady", "shut"};
    static const char *const VALVE[] = {"test", "static",        "steady",
                                        "shut", "closed from R", "closed from C"};
    static const char *const OUTLET[] = {"test", "static", "steady", "shut",
                                         "closed from X"};
    assert_cases(&n, "L", BEND, 4);
    assert_cases(&n, "V", VALVE, 6);
    assert_cases(&n, "E", OUTLET, 5);
    kent_net_clear(&n);
}

static void a_scenario_that_was_not_run_has_no_case(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    kent_net_finish(&n);
    static const char *const BEND[] = {"test", "static", "steady"};
    assert_cases(&n, "L", BEND, 3);
    kent_net_clear(&n);
}

static void without_a_test_pressure_there_is_no_test(void **state)
{
    (void)state;
    kent_build b = a_main();
    b.model->loads.test_pressure = (double)NAN;
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    static const char *const BEND[] = {"static", "steady"};
    assert_cases(&n, "L", BEND, 2);
    kent_net_clear(&n);
}

/* Gauge at E, 5 m: 25 m of water less at C. */
static void test_pressure_is_carried_by_elevation(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    kent_net_finish(&n);
    const kent_instant *low = &kent_net_case(&n, "L", "test")->worst[KENT_RESULTANT];
    const kent_instant *high = &kent_net_case(&n, "C", "test")->worst[KENT_RESULTANT];
    assert_close(low->pressure, 12e5, 1e-12);
    assert_close(high->pressure, 12e5 - RHO * G * 25.0, 1e-12);
    assert_true(high->balance.port[0].flow == 0.0);
    kent_net_clear(&n);
}

static void static_pressure_is_of_the_highest_level_or_the_one_stated(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    kent_net_finish(&n);
    assert_close(kent_net_case(&n, "L", "static")->worst[KENT_RESULTANT].pressure,
                 RHO * G * 95.0, 1e-12);
    kent_net_clear(&n);

    kent_build b = a_main();
    b.model->loads.static_level = 130.0;
    n = kent_net_of(b);
    kent_net_finish(&n);
    assert_close(kent_net_case(&n, "L", "static")->worst[KENT_RESULTANT].pressure,
                 RHO * G * 125.0, 1e-12);
    kent_net_clear(&n);
}

/* 9.15: 10 m and 50 m at no flow, in pipes and on a valve that shuts, without a test.
 */
static void pumps_at_no_flow_press_too(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    b.model->water.density = RHO;
    b.model->gravity = G;
    kent_build_point(&b, "P", 0.0, 0.0, 0.0);
    kent_build_point(&b, "V", 100.0, 0.0, 2.0);
    kent_build_point(&b, "L", 200.0, 0.0, 2.0);
    kent_build_point(&b, "R", 200.0, 100.0, 0.0);
    kent_build_pipe(&b, "A", "P V L R", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 20.0);
    kent_build_valve(&b, "G", "V", 0.1, (double)NAN);
    const int p = kent_build_pump(&b, "PS", "P", NULL, 50.0, 0.05, 40.0);
    b.model->pumps[p].suction_level = 10.0;
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    assert_close(kent_net_case(&n, "L", "shut-off")->worst[KENT_RESULTANT].pressure,
                 RHO * G * 58.0, 1e-12);
    const kent_load_case *closed = kent_net_case(&n, "V", "closed from P");
    assert_int_equal(closed->kind, KENT_CASE_SHUT_OFF);
    assert_close(closed->worst[KENT_RESULTANT].pressure, RHO * G * 58.0, 1e-12);
    kent_net_clear(&n);
}

/* The head at the reducer belongs to its wide side; the narrow one gains what Bernoulli
 * takes. Frictionless, so that the head is known. */
static void velocity_lowers_the_pressure_of_the_narrow_port(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    kent_net_finish(&n);
    const kent_instant *i = &kent_net_case(&n, "X", "steady")->worst[KENT_RESULTANT];
    const double q = i->balance.port[1].flow;
    const double wide = q / area(0.5), narrow = q / area(0.4);
    assert_true(q > 0.05);
    assert_close(i->balance.port[0].flow, -q, 1e-9);
    assert_close(i->balance.port[1].pressure,
                 i->balance.port[0].pressure +
                     0.5 * RHO * (wide * wide - narrow * narrow),
                 1e-12);
    assert_close(i->pressure, i->balance.port[0].pressure, 1e-12);
    assert_true(isnan(i->time));
    kent_net_clear(&n);
}

/* Signs, not sizes: with pressure inside, and with suction. */
static void assert_signs(const kent_net *n, double sign)
{
    const kent_vec3 tee =
        kent_net_case(n, "T", "static")->worst[KENT_RESULTANT].balance.thrust;
    assert_true(sign * tee.y < 0.0); /* the branch goes north */
    assert_true(tee.x == 0.0 && tee.z == 0.0);
    const kent_vec3 reducer =
        kent_net_case(n, "X", "static")->worst[KENT_RESULTANT].balance.thrust;
    assert_true(sign * reducer.x > 0.0); /* narrows eastwards */
    const kent_vec3 crest =
        kent_net_case(n, "C", "static")->worst[KENT_RESULTANT].balance.thrust;
    assert_true(sign * crest.z > 0.0);
    const kent_vec3 sag =
        kent_net_case(n, "L", "static")->worst[KENT_RESULTANT].balance.thrust;
    assert_true(sign * sag.z < 0.0);
    const kent_vec3 end =
        kent_net_case(n, "D", "static")->worst[KENT_RESULTANT].balance.thrust;
    assert_true(sign * end.y > 0.0); /* on, out of the pipe's end */
}

static void every_fitting_is_pushed_the_right_way(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    kent_net_finish(&n);
    assert_int_equal(kent_net_fitting(&n, "C")->orientation, KENT_CREST);
    assert_int_equal(kent_net_fitting(&n, "L")->orientation, KENT_SAG);
    assert_signs(&n, 1.0);
    kent_net_clear(&n);
}

static void suction_pulls_every_fitting_the_other_way(void **state)
{
    (void)state;
    kent_build b = a_main();
    b.model->loads.static_level = -4.0;
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    assert_signs(&n, -1.0);
    kent_net_clear(&n);
}

/* Surge reaches 150 m above datum at both sides: 11.77 bar at V, above the test's 9.55
 * bar there (12 bar less 25 m) and the static 6.86. */
static void a_closed_valve_is_pressed_from_either_side(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    take_two(&n, 90.0, 150.0);
    kent_net_finish(&n);
    const double force = RHO * G * 120.0 * area(0.52);
    const kent_load_case *up = kent_net_case(&n, "V", "closed from R");
    const kent_load_case *down = kent_net_case(&n, "V", "closed from C");
    const kent_vec3 east = up->worst[KENT_RESULTANT].balance.thrust;
    const kent_vec3 west = down->worst[KENT_RESULTANT].balance.thrust;
    assert_close(east.x, force, 1e-12); /* away from R */
    assert_close(west.x, -force, 1e-12);
    assert_int_equal(up->kind, KENT_CASE_OCCASIONAL);
    assert_int_equal(up->scenario, 0);
    assert_true(up->closed && up->worst[KENT_RESULTANT].time == 0.5);
    assert_true(isnan(up->above_90_percent));
    /* open, the two sides balance but for the valve's loss */
    const kent_vec3 open =
        kent_net_case(&n, "V", "static")->worst[KENT_RESULTANT].balance.thrust;
    assert_true(open.x == 0.0);
    kent_net_clear(&n);
}

/* At V the test brings 9.55 bar, rest 6.86 and the surge 7.84: with the factor 1.2 the
 * test asks for most, 11.46; but rest for 11.66 with one of 1.7. */
static void
a_closed_valve_is_pressed_by_what_asks_for_most_with_its_factor(void **state)
{
    (void)state;
    kent_build b = a_main();
    b.model->loads.factor[KENT_CASE_TEST] = 1.2;
    b.model->loads.factor[KENT_CASE_STATIC] = 1.7;
    b.model->loads.factor[KENT_CASE_OCCASIONAL] = 1.2;
    kent_net n = kent_net_of(b);
    take_two(&n, 90.0, 110.0);
    kent_net_finish(&n);
    const kent_load_case *c = kent_net_case(&n, "V", "closed from R");
    assert_int_equal(c->kind, KENT_CASE_STATIC);
    assert_close(c->worst[KENT_RESULTANT].pressure, RHO * G * 70.0, 1e-12);
    kent_net_clear(&n);
}

static void a_closed_valve_takes_the_factor_of_what_presses(void **state)
{
    (void)state;
    kent_build b = a_main();
    b.model->loads.factor[KENT_CASE_TEST] = 1.2;
    b.model->loads.factor[KENT_CASE_STATIC] = 1.3;
    b.model->loads.factor[KENT_CASE_OCCASIONAL] = 1.2;
    kent_net n = kent_net_of(b);
    take_two(&n, 90.0, 110.0); /* the test presses more */
    kent_net_finish(&n);
    const kent_load_case *test = kent_net_case(&n, "V", "closed from R");
    assert_int_equal(test->kind, KENT_CASE_TEST);
    assert_true(test->safety_factor == 1.2);
    assert_int_equal(test->scenario, -1);
    kent_net_clear(&n);

    b = a_main();
    b.model->loads.test_pressure = (double)NAN;
    b.model->loads.factor[KENT_CASE_STATIC] = 1.7;
    n = kent_net_of(b);
    take_two(&n, 90.0, 95.0);
    kent_net_finish(&n);
    const kent_load_case *rest = kent_net_case(&n, "V", "closed from R");
    assert_int_equal(rest->kind, KENT_CASE_STATIC);
    assert_true(rest->safety_factor == 1.7);
    kent_net_clear(&n);
}

/* The sides of an open valve keep their own pressures. */
static void the_loss_of_a_valve_pushes_it_along(void **state)
{
    (void)state;
    kent_build b = a_main();
    b.model->valves[0].capacity = 0.1;
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    const kent_instant *i = &kent_net_case(&n, "V", "steady")->worst[KENT_RESULTANT];
    const kent_port_state *p = i->balance.port;
    assert_true(p[0].pressure > p[1].pressure + 1e4);
    assert_close(i->balance.thrust.x, (p[0].pressure - p[1].pressure) * area(0.52),
                 1e-9);
    assert_true(i->pressure == p[0].pressure);
    kent_net_clear(&n);
}

/* Between pipes of two sizes each side keeps the pressure of its own head: what the
 * stream regains or loses is the valve's affair. */
static void a_valve_between_two_sizes_has_the_pressure_of_each_head(void **state)
{
    (void)state;
    kent_build b = a_main();
    b.model->pipes[0].inside_diameter = 0.3;
    b.model->pipes[0].outside_diameter = 0.32;
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    const kent_instant *i = &kent_net_case(&n, "V", "steady")->worst[KENT_RESULTANT];
    const int a = kent_build_span_of(&n.build, "A");
    const kent_span *span = &n.model->spans[a];
    const double before = n.steady->node_head[span->node[1]];
    const double speed = n.steady->span_flow[a] / area(0.3);
    assert_true(0.5 * RHO * speed * speed > 1000.0); /* Pa, that must not come in */
    assert_close(i->balance.port[0].pressure, RHO * G * (before - 30.0), 1e-12);
    kent_net_clear(&n);
}

/* The jet behind an outlet valve is left out: pressure and arriving stream push it on.
 */
static void an_outlet_valve_is_pushed_out_of_the_pipes_end(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    kent_net_finish(&n);
    const kent_instant *i = &kent_net_case(&n, "E", "steady")->worst[KENT_RESULTANT];
    assert_int_equal(i->balance.port_count, 1);
    assert_true(i->balance.port[0].momentum_flux > 0.0);
    assert_close(i->balance.thrust.x,
                 i->balance.port[0].pressure * area(0.42) +
                     i->balance.port[0].momentum_flux,
                 1e-12);
    kent_net_clear(&n);
}

static void factors_follow_the_kind_of_case(void **state)
{
    (void)state;
    kent_build b = a_main();
    b.model->loads.factor[KENT_CASE_TEST] = 1.25;
    b.model->loads.factor[KENT_CASE_EXCEPTIONAL] = 1.1;
    b.model->scenarios[0].class_of = KENT_EXCEPTIONAL;
    kent_net n = kent_net_of(b);
    take_two(&n, 90.0, 95.0);
    kent_net_finish(&n);
    assert_true(kent_net_case(&n, "L", "test")->safety_factor == 1.25);
    assert_true(kent_net_case(&n, "L", "steady")->safety_factor == 1.5); /* rules' */
    assert_true(kent_net_case(&n, "L", "shut")->safety_factor == 1.1);
    assert_int_equal(kent_net_case(&n, "L", "shut")->kind, KENT_CASE_EXCEPTIONAL);
    kent_net_clear(&n);
}

static void each_class_of_scenario_has_its_own_factor(void **state)
{
    (void)state;
    static const struct {
        kent_class class_of;
        kent_case_kind kind;
    } ROWS[] = {{KENT_RECURRING, KENT_CASE_RECURRING},
                {KENT_OCCASIONAL, KENT_CASE_OCCASIONAL},
                {KENT_EXCEPTIONAL, KENT_CASE_EXCEPTIONAL}};
    for (size_t i = 0; i < 3; i++) {
        kent_build b = a_main();
        b.model->scenarios[0].class_of = ROWS[i].class_of;
        b.model->loads.factor[KENT_CASE_RECURRING] = 2.0;
        b.model->loads.factor[KENT_CASE_OCCASIONAL] = 1.6;
        b.model->loads.factor[KENT_CASE_EXCEPTIONAL] = 1.1;
        kent_net n = kent_net_of(b);
        take_two(&n, 90.0, 95.0);
        kent_net_finish(&n);
        const kent_load_case *c = kent_net_case(&n, "L", "shut");
        assert_int_equal(c->kind, ROWS[i].kind);
        assert_true(c->safety_factor == b.model->loads.factor[ROWS[i].kind]);
        kent_net_clear(&n);
    }
}

static void weight_counts_only_where_it_is_given(void **state)
{
    (void)state;
    kent_build b = a_main();
    const int note = kent_build_note(&b, "T");
    b.model->notes[note].weight = 4000.0;
    kent_net n = kent_net_of(b);
    take_two(&n, 90.0, 95.0);
    kent_net_finish(&n);
    static const char *const NAMES[] = {"test", "static", "steady", "shut"};
    for (size_t k = 0; k < 4; k++) {
        const kent_load_case *c = kent_net_case(&n, "T", NAMES[k]);
        assert_close(c->worst[KENT_DOWNWARD].balance.thrust.z, -4000.0, 1e-12);
        assert_false(c->worst[KENT_UPWARD].set);
    }
    const kent_load_case *end = kent_net_case(&n, "D", "shut");
    assert_false(end->worst[KENT_DOWNWARD].set);
    kent_net_clear(&n);
}

/* Joukowsky (1898): a valve shut at once in a frictionless main adds a V0/g. Through
 * the march itself, onto the closed valve. */
static void a_sudden_closure_presses_by_joukowskys_head(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 20.0);
    (void)kent_build_point(&b, "P", 600.0, 0.0, 20.0);
    (void)kent_build_point(&b, "E", 600.0, 400.0, 20.0);
    (void)kent_build_pipe(&b, "A", "R P E", 0.5, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    const int v = kent_build_valve(&b, "VE", "E", 0.05, 20.0);
    const int s = kent_build_scenario(&b, "shut", 2.5);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.0, 0.0, 0.0);
    b.model->solver.friction = KENT_SURGE_NONE;
    kent_net n = kent_net_of(b);

    kent_error err = {0};
    kent_grid *grid = NULL;
    kent_marcher *march = NULL;
    kent_trace trace = {0};
    assert_int_equal(kent_grid_plan(n.model, 2.5, &grid, &err), KENT_OK);
    assert_int_equal(kent_marcher_new(n.model, n.steady, grid, s, n.watches,
                                      n.watch_count, 64, &march, &err),
                     KENT_OK);
    kent_recorder_start(n.recorder, s, grid->step);
    for (size_t left = (size_t)(1.9 / grid->step); left > 0;) {
        const size_t got =
            kent_marcher_advance(march, left < 64 ? left : 64, &trace, &err);
        assert_true(got > 0);
        kent_recorder_take(n.recorder, s, &trace);
        left -= got;
    }
    kent_net_finish(&n);

    const double speed = n.steady->span_flow[0] / area(0.5);
    const double head =
        n.steady->node_head[n.model->spans[0].node[1]] + 1000.0 * speed / G;
    const double p = RHO * G * (head - 20.0);
    const kent_vec3 valve =
        kent_net_case(&n, "E", "closed from P")->worst[KENT_RESULTANT].balance.thrust;
    const kent_instant *bend = &kent_net_case(&n, "P", "shut")->worst[KENT_RESULTANT];
    assert_close(valve.y, p * area(0.52), 1e-6);
    assert_close(kent_vec3_length(bend->balance.thrust),
                 2.0 * p * area(0.52) * sin(PI / 4.0), 1e-6);
    assert_true(bend->time >= 0.4); /* the wave has 400 m to go */
    kent_marcher_free(march);
    kent_grid_free(grid);
    kent_net_clear(&n);
}

static void azimuths_run_clockwise_from_north(void **state)
{
    (void)state;
    static const struct {
        kent_vec3 thrust;
        double degrees;
    } ROWS[] = {{{0.0, 5.0, 1.0}, 0.0},
                {{5.0, 0.0, 1.0}, 90.0},
                {{0.0, -5.0, 1.0}, 180.0},
                {{-5.0, 0.0, 1.0}, 270.0},
                {{-5.0, 5.0, 1.0}, 315.0}};
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        assert_within(kent_thrust_azimuth(ROWS[i].thrust) * 180.0 / PI, ROWS[i].degrees,
                      1e-9);
    }
    assert_close(kent_thrust_horizontal((kent_vec3){3.0, -4.0, 12.0}), 5.0, 1e-15);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(cases_stand_in_their_order),
        cmocka_unit_test(a_scenario_that_was_not_run_has_no_case),
        cmocka_unit_test(without_a_test_pressure_there_is_no_test),
        cmocka_unit_test(test_pressure_is_carried_by_elevation),
        cmocka_unit_test(static_pressure_is_of_the_highest_level_or_the_one_stated),
        cmocka_unit_test(pumps_at_no_flow_press_too),
        cmocka_unit_test(velocity_lowers_the_pressure_of_the_narrow_port),
        cmocka_unit_test(every_fitting_is_pushed_the_right_way),
        cmocka_unit_test(suction_pulls_every_fitting_the_other_way),
        cmocka_unit_test(a_closed_valve_is_pressed_from_either_side),
        cmocka_unit_test(
            a_closed_valve_is_pressed_by_what_asks_for_most_with_its_factor),
        cmocka_unit_test(a_closed_valve_takes_the_factor_of_what_presses),
        cmocka_unit_test(the_loss_of_a_valve_pushes_it_along),
        cmocka_unit_test(a_valve_between_two_sizes_has_the_pressure_of_each_head),
        cmocka_unit_test(an_outlet_valve_is_pushed_out_of_the_pipes_end),
        cmocka_unit_test(factors_follow_the_kind_of_case),
        cmocka_unit_test(each_class_of_scenario_has_its_own_factor),
        cmocka_unit_test(weight_counts_only_where_it_is_given),
        cmocka_unit_test(a_sudden_closure_presses_by_joukowskys_head),
        cmocka_unit_test(azimuths_run_clockwise_from_north),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
