/* A relief valve and a burst, each alone. */
#include "kent_ends_internal.h"
#include "lone.h"

#include <math.h>
#include <string.h>

static const double G = 9.81;
static const double WEIGHT = 9810.0; /* N/m3 */
static const double Y = 0.02;        /* m2/s: a main of about 0.5 m */

/* At level 10 m: set 100 m of pressure, open at 110 m; discharges at 12 m. */
static kent_relief_valve relief_of(double capacity)
{
    return (kent_relief_valve){.id = "RV",
                               .point = 0,
                               .set_pressure = 100.0 * WEIGHT,
                               .full_open_pressure = 110.0 * WEIGHT,
                               .low_set_pressure = (double)NAN,
                               .size = 0.25,
                               .capacity = capacity,
                               .closure_time = 20.0,
                               .discharge_level = 12.0,
                               .place = {0, 7}};
}

static void relief_new(lone *l, kent_relief_valve *valve, double head, double step)
{
    lone_new(l, &KENT_AT_RELIEF_VALVE, 10.0);
    l->model.relief_valves = valve;
    lone_start(l, 0.0, head, 0.0, step);
}

static double share(double head) { return fmin(fmax((head - 110.0) / 10.0, 0.0), 1.0); }

/* The pipe gives y (c - H); a valve of this size keeps the head between set and full.
 */
static void it_holds_the_pressure_between_set_and_full(void **state)
{
    (void)state;
    lone l;
    kent_relief_valve valve = relief_of(0.2);
    relief_new(&l, &valve, 80.0, 0.01);
    double passed = 0.0;
    for (int i = 0; i < 2000; i++) {
        const double c =
            80.0 + 130.0 * i / 2000.0; /* m, slowly: no stroke to wait for */
        lone_beside(&l, c, Y);
        const double x = lone_told(&l, 0), h = l.head[0];
        assert_within(x, share(h), 1e-9);
        assert_within(l.flow, 0.2 * x * sqrt(fmax(h - 12.0, 0.0)), 1e-9);
        if (c < 110.0) assert_true(l.flow == 0.0 && h == c);
        assert_true(h <= 120.0);
        passed = fmax(passed, l.flow);
    }
    assert_true(passed > 1.0 && l.head[0] > 110.0);
    assert_close(lone_told(&l, 1), l.through, 1e-12);
    lone_clear(&l);
}

/* It has risen to fully open; the pressure falls at once: it closes in 20 s. */
static void it_closes_no_faster_than_its_stroke(void **state)
{
    (void)state;
    lone l;
    kent_relief_valve valve = relief_of(0.05);
    relief_new(&l, &valve, 80.0, 0.05);
    lone_beside(&l, 300.0, Y);
    assert_true(lone_told(&l, 0) == 1.0);
    for (int i = 1; i <= 500; i++) {
        lone_beside(&l, 60.0, Y);
        const double x = fmax(1.0 - 0.05 * i / 20.0, 0.0);
        assert_within(lone_told(&l, 0), x, 1e-12);
        assert_within(l.flow, kent_gate_flow(0.05 * x, 60.0 - 12.0, 1.0 / Y), 1e-9);
    }
    assert_true(l.flow == 0.0);
    lone_beside(&l, 300.0, Y);
    const double before = lone_told(&l, 0);
    assert_true(before == 1.0);
    lone_beside(&l, 5.0, Y); /* lets nothing in */
    assert_true(l.flow == 0.0 && l.head[0] == 5.0);
    lone_clear(&l);
}

static void it_opens_no_faster_than_its_stroke(void **state)
{
    (void)state;
    lone l;
    kent_relief_valve valve = relief_of(0.05);
    valve.opening_time = 2.0;
    relief_new(&l, &valve, 80.0, 0.05);
    for (int i = 1; i <= 60; i++) {
        lone_beside(&l, 300.0, Y);
        assert_within(lone_told(&l, 0), fmin(0.025 * i, 1.0), 1e-12);
    }
    lone_clear(&l);
}

/* The pressure dips for a moment: it opens in 2 s, stays 5 s, closes in 20 s, and does
 * not fall for the same dip twice; nor does it before the pressure has been up again.
 */
static void one_that_anticipates_opens_on_the_fall(void **state)
{
    (void)state;
    lone l;
    kent_relief_valve valve = relief_of(0.05);
    valve.opening_time = 2.0;
    valve.hold_time = 5.0;
    valve.low_set_pressure = 30.0 * WEIGHT; /* 40 m of head */
    relief_new(&l, &valve, 80.0, 0.05);
    double opened = NAN, full = NAN, leaves = NAN, shut = NAN;
    int times = 0;
    for (int i = 1; i <= 2000; i++) {
        const bool dips = (i > 20 && i <= 40) || i > 1200; /* 1 .. 2 s, and for good */
        const double before = lone_told(&l, 0);
        lone_beside(&l, dips ? 30.0 : 80.0, Y);
        const double x = lone_told(&l, 0);
        if (before == 0.0 && x > 0.0) times++;
        if (i > 1200) continue;
        if (isnan(opened) && x > 0.0) opened = l.time;
        if (isnan(full) && x >= 1.0 - 1e-9) full = l.time;
        if (isnan(leaves) && !isnan(full) && x < 1.0 - 1e-9) leaves = l.time;
        if (isnan(shut) && !isnan(leaves) && x == 0.0) shut = l.time;
        assert_within(l.flow,
                      kent_gate_flow(0.05 * x, (dips ? 30.0 : 80.0) - 12.0, 1.0 / Y),
                      1e-9);
    }
    assert_within(opened, 1.10, 1e-9); /* a step after it was seen */
    assert_within(full, 3.05, 1e-9);
    assert_within(leaves, 8.10, 1e-9);
    assert_within(shut, 28.05, 1e-9);
    assert_int_equal(times, 2);
    assert_true(lone_told(&l, 0) == 0.0); /* the pressure has not been up again */
    lone_clear(&l);
}

static void it_starts_as_open_as_its_steady_flow_says(void **state)
{
    (void)state;
    lone l;
    kent_relief_valve valve = relief_of(0.05);
    const double flow = 0.05 * 0.3 * sqrt(113.0 - 12.0);
    lone_new(&l, &KENT_AT_RELIEF_VALVE, 10.0);
    l.model.relief_valves = &valve;
    lone_start(&l, flow, 113.0, 0.0, 0.05);
    assert_close(lone_told(&l, 0), 0.3, 1e-12);
    for (int i = 0; i < 100; i++) {
        lone_beside(&l, 113.0 + flow / Y, Y);
        assert_close(l.head[0], 113.0, 1e-11);
    }
    lone_clear(&l);
}

static void one_that_makes_no_sense_is_refused(void **state)
{
    (void)state;
    lone l;
    kent_relief_valve valve = relief_of(0.05);
    lone_new(&l, &KENT_AT_RELIEF_VALVE, 10.0);
    l.model.relief_valves = &valve;
    valve.discharge_level = 120.0;
    lone_refused(&l, 80.0, "below the discharge_level of 120.00 m");
    valve = relief_of(0.05);
    valve.low_set_pressure = 75.0 * WEIGHT;
    lone_refused(&l, 80.0, "it would open at once");
    lone_clear(&l);
}

static void its_law_has_one_answer_and_true_slopes(void **state)
{
    (void)state;
    lone l;
    kent_relief_valve valve = relief_of(0.05);
    valve.opening_time = 4.0;
    relief_new(&l, &valve, 115.0, 0.5);
    for (int i = 0; i < 6; i++) { /* strokes between 0 .. 1/8 and 5/8 .. 6/8 */
        l.ops->move(&l.state, l.schedule, 0.5, 0.5);
        lone_check_law(&l, 1.0, 30.0, false);
        lone_beside(&l, 160.0, Y);
    }
    lone_clear(&l);
}

/* ---- burst ----------------------------------------------------------------------- */

static void burst_new(lone *l, kent_burst *burst, double coefficient)
{
    lone_new(l, &KENT_AT_BURST, 10.0);
    const int s = kent_build_scenario(&l->build, "burst", 20.0);
    const int e = kent_build_ramp(&l->build, s, KENT_EVENT_BURST, 0, 1.0, 0.5, 0.01);
    l->build.model->events[e].coefficient = coefficient;
    l->model.bursts = burst;
    l->model.burst_count = 1;
    lone_start(l, 0.0, 60.0, 0.0, 0.1);
}

/* Torricelli: Q = C A sqrt(2 g h) */
static void a_hole_lets_out_what_torricelli_says(void **state)
{
    (void)state;
    lone l;
    kent_burst burst = {.point = 0};
    burst_new(&l, &burst, 0.6);
    for (int i = 1; i <= 50; i++) {
        const double area = 0.01 * fmin(fmax((0.1 * i - 1.0) / 0.5, 0.0), 1.0);
        lone_beside(&l, 60.0, Y);
        assert_within(lone_told(&l, 0), area, 1e-12);
        assert_within(l.flow, 0.6 * area * sqrt(2.0 * G * (l.head[0] - 10.0)), 1e-9);
    }
    assert_true(l.flow > 0.1);
    assert_close(lone_told(&l, 1), l.through, 1e-12);
    assert_null(l.ops->caution(&l.state));
    lone_clear(&l);
}

static void nothing_enters_a_hole_and_it_is_said(void **state)
{
    (void)state;
    lone l;
    kent_burst burst = {.point = 0};
    burst_new(&l, &burst, 0.6);
    lone_beside(&l, 5.0, Y); /* whole as yet */
    assert_null(l.ops->caution(&l.state));
    for (int i = 0; i < 30; i++) {
        lone_beside(&l, 5.0, Y);
        assert_true(l.flow == 0.0 && l.head[0] == 5.0);
    }
    assert_non_null(strstr(l.ops->caution(&l.state), "air, or dirty water"));
    lone_check_law(&l, 1.0, 20.0, false);
    lone_clear(&l);
}

static void a_hole_of_another_scenario_stays_whole(void **state)
{
    (void)state;
    lone l;
    kent_burst burst = {.point = 0};
    lone_new(&l, &KENT_AT_BURST, 10.0);
    l.model.bursts = &burst;
    lone_start(&l, 0.0, 60.0, 0.0, 0.1);
    for (int i = 0; i < 30; i++) {
        lone_beside(&l, 60.0, Y);
        assert_true(l.flow == 0.0 && lone_told(&l, 0) == 0.0);
    }
    lone_clear(&l);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(it_holds_the_pressure_between_set_and_full),
        cmocka_unit_test(it_closes_no_faster_than_its_stroke),
        cmocka_unit_test(it_opens_no_faster_than_its_stroke),
        cmocka_unit_test(one_that_anticipates_opens_on_the_fall),
        cmocka_unit_test(it_starts_as_open_as_its_steady_flow_says),
        cmocka_unit_test(one_that_makes_no_sense_is_refused),
        cmocka_unit_test(its_law_has_one_answer_and_true_slopes),
        cmocka_unit_test(a_hole_lets_out_what_torricelli_says),
        cmocka_unit_test(nothing_enters_a_hole_and_it_is_said),
        cmocka_unit_test(a_hole_of_another_scenario_stays_whole),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
