#include "kent_valve.h"
#include "kent_check.h"

#include <math.h>

static void capacity_from_loss_passes_what_the_loss_says(void **state)
{
    (void)state;
    const double g = 9.80665, k = 0.24, d = 0.6, v = 1.7;
    const double area = 0.25 * acos(-1.0) * d * d;
    const double head = k * v * v / (2.0 * g);
    assert_close(kent_valve_capacity_from_loss(k, d, g) * sqrt(head), v * area, 1e-14);
}

/* IEC 60534-1: Kv is m3/h of water at 1 bar */
static void capacity_from_kv_passes_it_at_one_bar(void **state)
{
    (void)state;
    const double g = 9.80665, head = 1e5 / (1000.0 * g);
    assert_close(kent_valve_capacity_from_kv(900.0, g) * sqrt(head) * 3600.0, 900.0,
                 1e-14);
}

/* Cv is US gallon/min at 1 psi; Cv = 1.156 Kv is common practice, no source */
static void capacity_from_cv_is_865_thousandths_of_kv(void **state)
{
    (void)state;
    const double g = 9.80665, head = 6894.757293168 / (1000.0 * g);
    assert_close(kent_valve_capacity_from_cv(100.0, g) * sqrt(head),
                 100.0 * 3.785411784e-3 / 60.0, 1e-11);
    assert_close(kent_valve_capacity_from_kv(1.0, g) /
                     kent_valve_capacity_from_cv(1.0, g),
                 1.156, 5e-4);
}

static void four_times_the_loss_is_half_the_capacity(void **state)
{
    (void)state;
    const double opening[] = {0.5, 1.0, 0.25}, loss[] = {0.8, 0.2, 20.0};
    kent_valve_curve curve;
    assert_true(kent_valve_curve_from_loss(opening, loss, 3, &curve));
    assert_close(kent_valve_relative_capacity(&curve, 1.0), 1.0, 1e-15);
    assert_close(kent_valve_relative_capacity(&curve, 0.5), 0.5, 1e-15);
    assert_close(kent_valve_relative_capacity(&curve, 0.25), 0.1, 1e-15);
    assert_close(kent_valve_relative_capacity(&curve, 0.75), 0.75, 1e-15);
    assert_close(kent_valve_relative_capacity(&curve, 0.125), 0.05, 1e-15);
    assert_true(kent_valve_relative_capacity(&curve, 0.0) == 0.0);
    assert_close(curve.lowest_given, 0.25, 1e-15);
    /* held within 0 .. 1 */
    assert_true(kent_valve_relative_capacity(&curve, -0.1) == 0.0);
    assert_close(kent_valve_relative_capacity(&curve, 1.1), 1.0, 1e-15);
}

static void a_table_that_ends_early_counts_its_last_point_as_open(void **state)
{
    (void)state;
    const double opening[] = {0.5, 0.944}, loss[] = {0.96, 0.24};
    kent_valve_curve curve;
    assert_true(kent_valve_curve_from_loss(opening, loss, 2, &curve));
    assert_close(kent_valve_relative_capacity(&curve, 0.944), 1.0, 1e-15);
    assert_close(kent_valve_relative_capacity(&curve, 1.0), 1.0, 1e-15);
    assert_close(kent_valve_relative_capacity(&curve, 0.5), 0.5, 1e-15);
}

static void closed_is_closed_whatever_the_table_says_there(void **state)
{
    (void)state;
    const double opening[] = {0.0, 1.0}, loss[] = {1e6, 0.2}, shut[] = {INFINITY, 0.2};
    kent_valve_curve curve;
    assert_true(kent_valve_curve_from_loss(opening, loss, 2, &curve));
    assert_true(kent_valve_relative_capacity(&curve, 0.0) == 0.0);
    assert_true(curve.lowest_given == 0.0);
    assert_true(kent_valve_curve_from_loss(opening, shut, 2, &curve));
    assert_close(kent_valve_relative_capacity(&curve, 0.5), 0.5, 1e-15);
}

static void tables_that_make_no_curve_are_refused(void **state)
{
    (void)state;
    const double bad_opening[][2] = {{0.5, 0.5}, {-0.1, 1.0}, {0.5, 1.1}, {NAN, 1.0}};
    const double bad_loss[][2] = {
        {0.0, 0.2}, {-1.0, 0.2}, {NAN, 0.2}, {0.1, 0.2}, {1.0, INFINITY}};
    const double opening[] = {0.5, 1.0}, loss[] = {0.8, 0.2};
    double many[KENT_VALVE_POINTS], losses[KENT_VALVE_POINTS];
    kent_valve_curve curve = {.count = 77};

    for (size_t i = 0; i < 4; i++) {
        assert_false(kent_valve_curve_from_loss(bad_opening[i], loss, 2, &curve));
    }
    for (size_t i = 0; i < 5; i++) {
        assert_false(kent_valve_curve_from_loss(opening, bad_loss[i], 2, &curve));
    }
    assert_false(kent_valve_curve_from_loss(opening, loss, 1, &curve));
    for (int i = 0; i < KENT_VALVE_POINTS; i++) {
        many[i] = (i + 1.0) / KENT_VALVE_POINTS;
        losses[i] = 1.0 / many[i];
    }
    assert_false(
        kent_valve_curve_from_loss(many, losses, KENT_VALVE_POINTS - 1, &curve));
    assert_int_equal(curve.count, 77); /* left alone */
    assert_true(
        kent_valve_curve_from_loss(many, losses, KENT_VALVE_POINTS - 2, &curve));
}

static void a_curve_rises_from_nothing_to_one_without_a_jump(void **state)
{
    (void)state;
    /* A butterfly valve's K by disc angle, Weisbach's tests (from memory) */
    const double opening[] = {0.944, 0.889, 0.778, 0.667, 0.556, 0.444, 0.333, 0.222};
    const double loss[] = {0.24, 0.52, 1.54, 3.91, 10.8, 32.6, 118.0, 751.0};
    kent_valve_curve curve;
    assert_true(kent_valve_curve_from_loss(opening, loss, 8, &curve));
    double last = 0.0;
    for (int i = 1; i <= 1000; i++) {
        const double now = kent_valve_relative_capacity(&curve, 0.001 * i);
        assert_true(now >= last && now - last < 0.01 && now <= 1.0);
        last = now;
    }
    assert_close(last, 1.0, 1e-15);
}

static void a_linear_valve_passes_in_proportion(void **state)
{
    (void)state;
    const kent_valve_curve curve = kent_valve_curve_linear();
    for (int i = 0; i <= 8; i++) {
        const double o = 0.125 * i;
        assert_within(kent_valve_relative_capacity(&curve, o), o, 1e-15);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(capacity_from_loss_passes_what_the_loss_says),
        cmocka_unit_test(capacity_from_kv_passes_it_at_one_bar),
        cmocka_unit_test(capacity_from_cv_is_865_thousandths_of_kv),
        cmocka_unit_test(four_times_the_loss_is_half_the_capacity),
        cmocka_unit_test(a_table_that_ends_early_counts_its_last_point_as_open),
        cmocka_unit_test(closed_is_closed_whatever_the_table_says_there),
        cmocka_unit_test(tables_that_make_no_curve_are_refused),
        cmocka_unit_test(a_curve_rises_from_nothing_to_one_without_a_jump),
        cmocka_unit_test(a_linear_valve_passes_in_proportion),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
