/* Pressure reducing and sustaining valves, each alone between two pipes. */
#include "lone.h"

#include <math.h>

static const double WEIGHT = 9810.0; /* N/m3 */
static const double Y = 0.02;        /* m2/s: mains of about 0.5 m */
static const double E = 0.05;        /* m^2.5/s */

/* At level 10 m it holds 40 m of pressure: 50 m of head. */
static kent_control_valve control_of(kent_holds holds, double time)
{
    return (kent_control_valve){.id = "PR1",
                                .point = 0,
                                .holds = holds,
                                .set_pressure = 40.0 * WEIGHT,
                                .size = 0.2,
                                .capacity = E,
                                .opening_time = time,
                                .closure_time = time,
                                .place = {0, 7}};
}

static void control_new(lone *l, kent_control_valve *valve, double flow, double head0,
                        double head1)
{
    lone_new(l, &KENT_AT_CONTROL_VALVE, 10.0);
    l->model.control_valves = valve;
    lone_start(l, flow, head0, head1, 0.05);
}

static void step(lone *l, double c0, double c1)
{
    lone_step(l, (lone_line){c0, Y}, (lone_line){c1, Y});
}

/* 0.1 m3/s at 50 m behind it: arriving waves that keep it so, or other than that. */
static void a_reducing_valve_holds_the_pressure_behind_it(void **state)
{
    (void)state;
    lone l;
    kent_control_valve valve = control_of(KENT_HOLDS_DOWNSTREAM, 8.0);
    control_new(&l, &valve, 0.1, 80.0, 50.0);
    assert_close(lone_told(&l, 0), 0.1 / (E * sqrt(30.0)), 1e-12);
    for (int i = 0; i < 400; i++) {
        /* slow enough for its stroke of 8 s */
        step(&l, 85.0 + 8.0 * sin(0.02 * i), 45.0 + 1.0 * cos(0.03 * i) - 1.0);
        assert_within(l.head[1], 50.0, 1e-9);
        assert_within(l.flow, lone_told(&l, 0) * E * sqrt(l.head[0] - l.head[1]), 1e-9);
    }
    lone_clear(&l);
}

static void a_sustaining_valve_holds_the_pressure_before_it(void **state)
{
    (void)state;
    lone l;
    kent_control_valve valve = control_of(KENT_HOLDS_UPSTREAM, 8.0);
    control_new(&l, &valve, 0.1, 50.0, 20.0);
    for (int i = 0; i < 400; i++) {
        step(&l, 55.0 + 0.8 * sin(0.02 * i), 15.0 + 5.0 * cos(0.03 * i) - 5.0);
        assert_within(l.head[0], 50.0, 1e-9);
    }
    lone_clear(&l);
}

/* What it meets is raised at once by 60 m: the opening goes down by step/time and no
 * more, until the pressure is held again; the overshoot is what that leaves. */
static void it_overshoots_by_what_its_travel_leaves_and_comes_back(void **state)
{
    (void)state;
    lone l;
    kent_control_valve valve = control_of(KENT_HOLDS_DOWNSTREAM, 8.0);
    control_new(&l, &valve, 0.1, 80.0, 50.0);
    double before = lone_told(&l, 0), highest = 0.0;
    int strokes = 0, i = 0;
    for (; i < 400 && (i == 0 || l.head[1] > 50.0 + 1e-9); i++) {
        step(&l, 145.0, 45.0);
        const double now = lone_told(&l, 0);
        assert_true(before - now <= 0.05 / 8.0 + 1e-12);
        if (l.head[1] > 50.0 + 1e-9) {
            assert_close(before - now, 0.05 / 8.0, 1e-9);
            strokes++;
        }
        highest = fmax(highest, l.head[1]);
        before = now;
    }
    assert_true(highest > 50.5 && strokes > 10 && i < 400);
    /* what it comes to: 0.1 m3/s at 140 m before it */
    assert_close(lone_told(&l, 0), 0.1 / (E * sqrt(90.0)), 1e-9);
    lone_clear(&l);
}

static void it_is_fully_open_where_it_cannot_hold(void **state)
{
    (void)state;
    lone l;
    kent_control_valve valve = control_of(KENT_HOLDS_DOWNSTREAM, 2.0);
    control_new(&l, &valve, 0.1, 80.0, 50.0);
    for (int i = 0; i < 60; i++) {
        step(&l, 40.0, 10.0);
    }
    assert_true(lone_told(&l, 0) == 1.0);
    /* Q/E open and both pipes: Q^2/E^2 + 2 Q/Y = 30 m */
    assert_close(l.flow * l.flow / (E * E) + 2.0 * l.flow / Y, 30.0, 1e-10);
    lone_clear(&l);
}

static void it_shuts_where_the_pressure_behind_stays_above(void **state)
{
    (void)state;
    lone l;
    kent_control_valve valve = control_of(KENT_HOLDS_DOWNSTREAM, 2.0);
    control_new(&l, &valve, 0.1, 80.0, 50.0);
    for (int i = 0; i < 60; i++) {
        step(&l, 80.0, 60.0);
    }
    assert_true(lone_told(&l, 0) == 0.0 && l.flow == 0.0);
    assert_true(l.head[0] == 80.0 && l.head[1] == 60.0);
    step(&l, 80.0, 20.0); /* and opens again by its stroke */
    assert_close(lone_told(&l, 0), 0.05 / 2.0, 1e-12);
    lone_clear(&l);
}

/* Nothing flows at t = 0 and rounding has left the head behind a trifle below what it
 * holds: it is shut, not on its way there from fully open. */
static void at_rest_it_is_shut_whatever_rounding_left(void **state)
{
    (void)state;
    lone l;
    kent_control_valve valve = control_of(KENT_HOLDS_DOWNSTREAM, 8.0);
    control_new(&l, &valve, 0.0, 80.0, 50.0 - 1e-13);
    assert_true(lone_told(&l, 0) == 0.0);
    lone_clear(&l);
}

/* It reduces to 50 m: still water above that finds it shut, below it open. */
static void still_water_finds_it_as_its_pressure_asks(void **state)
{
    (void)state;
    for (int below = 0; below < 2; below++) {
        lone l;
        kent_control_valve valve = control_of(KENT_HOLDS_DOWNSTREAM, 8.0);
        const double head = below ? 45.0 : 60.0; /* m */
        control_new(&l, &valve, 0.0, head, head);
        assert_true(lone_told(&l, 0) == (double)below);
        lone_clear(&l);
    }
}

static void it_lets_nothing_back(void **state)
{
    (void)state;
    const kent_holds holds[] = {KENT_HOLDS_DOWNSTREAM, KENT_HOLDS_UPSTREAM};
    for (int k = 0; k < 2; k++) {
        lone l;
        kent_control_valve valve = control_of(holds[k], 2.0);
        control_new(&l, &valve, 0.1, 60.0, 45.0);
        for (int i = 0; i < 20; i++) {
            step(&l, 30.0, 45.0);
            assert_true(l.flow == 0.0);
        }
        lone_clear(&l);
    }
}

static void without_times_it_follows_at_once(void **state)
{
    (void)state;
    lone l;
    kent_control_valve valve = control_of(KENT_HOLDS_DOWNSTREAM, 0.0);
    control_new(&l, &valve, 0.1, 80.0, 50.0);
    for (int i = 0; i < 100; i++) {
        step(&l, i % 2 == 0 ? 145.0 : 75.0, 45.0);
        assert_within(l.head[1], 50.0, 1e-9);
    }
    lone_clear(&l);
}

static void its_law_has_one_answer_and_true_slopes(void **state)
{
    (void)state;
    const kent_holds holds[] = {KENT_HOLDS_DOWNSTREAM, KENT_HOLDS_UPSTREAM};
    for (int k = 0; k < 2; k++) {
        lone l;
        kent_control_valve valve = control_of(holds[k], 0.2);
        control_new(&l, &valve, 0.0, 49.0, 51.0);
        for (int i = 0; i < 4; i++) {
            l.ops->move(&l.state, l.schedule, 0.05, 0.05);
            lone_check_law(&l, 0.5, 30.0, true);
            step(&l, 70.0, 30.0);
        }
        lone_clear(&l);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_reducing_valve_holds_the_pressure_behind_it),
        cmocka_unit_test(a_sustaining_valve_holds_the_pressure_before_it),
        cmocka_unit_test(it_overshoots_by_what_its_travel_leaves_and_comes_back),
        cmocka_unit_test(it_is_fully_open_where_it_cannot_hold),
        cmocka_unit_test(it_shuts_where_the_pressure_behind_stays_above),
        cmocka_unit_test(at_rest_it_is_shut_whatever_rounding_left),
        cmocka_unit_test(still_water_finds_it_as_its_pressure_asks),
        cmocka_unit_test(it_lets_nothing_back),
        cmocka_unit_test(without_times_it_follows_at_once),
        cmocka_unit_test(its_law_has_one_answer_and_true_slopes),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
