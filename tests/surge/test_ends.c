/* What stands at an end, with numbers one can check by hand; networks of ends are in
 * test_marcher.c and test_closures.c. */
#include "kent_ends_internal.h"

#include "kent_check.h"

#include <math.h>

static void a_level_loses_velocity_head_on_the_way_out_only(void **state)
{
    (void)state;
    const kent_level level = {100.0, 3.0}; /* m, s2/m5 */
    const double y = 0.02;                 /* m2/s */
    for (int i = 0; i < 9; i++) {
        const double c = 40.0 + 7.0 * i; /* m */
        const double head = kent_level_head(&level, c, y), flow = (head - c) * y;
        assert_true(flow > 0.0);
        assert_close(head, 100.0 - 3.0 * flow * flow, 1e-13);
    }
    assert_true(kent_level_head(&level, 130.0, y) == 100.0);
    assert_true(kent_level_head(&level, 100.0, y) == 100.0);
}

static void a_draw_is_whole_until_the_pressure_is_gone(void **state)
{
    (void)state;
    const kent_draw draw = {0.3, 10.0, 0.0}; /* m3/s, m */
    const double y = 0.01;
    assert_close(kent_draw_head(&draw, 60.0, y), 30.0, 1e-14);
    assert_true(kent_draw_head(&draw, 35.0, y) == 10.0); /* 0.25 m3/s still come */
    assert_true(kent_draw_head(&draw, 5.0, y) == 5.0);   /* nothing comes */
}

static void a_draw_that_depends_on_pressure_follows_its_root(void **state)
{
    (void)state;
    const kent_draw draw = {0.3, 10.0, 20.0}; /* whole from 20 m above 10 m */
    const double y = 0.01;
    assert_close(kent_draw_head(&draw, 61.0, y), 31.0, 1e-14);
    for (int i = 0; i < 7; i++) {
        const double c = 11.0 + 7.0 * i; /* m */
        const double head = kent_draw_head(&draw, c, y);
        assert_true(head > 10.0 && head < 30.0);
        assert_close((c - head) * y, 0.3 * sqrt((head - 10.0) / 20.0), 1e-12);
    }
    assert_close(kent_draw_head(&draw, 60.0, y), 30.0, 1e-12); /* both laws meet */
    assert_true(kent_draw_head(&draw, 9.0, y) == 9.0);
}

static void what_feeds_the_main_does_so_at_any_pressure(void **state)
{
    (void)state;
    const kent_draw draw = {-0.3, 10.0, 0.0};
    assert_close(kent_draw_head(&draw, -50.0, 0.01), -20.0, 1e-14);
}

static void a_valve_passes_what_its_capacity_and_the_waves_allow(void **state)
{
    (void)state;
    for (int i = -9; i < 4; i++) {
        const double capacity = pow(10.0, i); /* m^2.5/s */
        for (int j = 0; j < 6; j++) {
            const double drop = -50.0 + 20.0 * j; /* m */
            const double q = kent_gate_flow(capacity, drop, 150.0);
            const double left = drop - 150.0 * q; /* m, over the valve */
            assert_true(q * drop > 0.0 && left * drop >= -1e-11);
            assert_close(q * fabs(q), capacity * capacity * left,
                         1e-9 * fmax(1.0, capacity));
        }
    }
    assert_true(kent_gate_flow(0.0, 30.0, 150.0) == 0.0);
    assert_true(kent_gate_flow(0.1, 0.0, 150.0) == 0.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_level_loses_velocity_head_on_the_way_out_only),
        cmocka_unit_test(a_draw_is_whole_until_the_pressure_is_gone),
        cmocka_unit_test(a_draw_that_depends_on_pressure_follows_its_root),
        cmocka_unit_test(what_feeds_the_main_does_so_at_any_pressure),
        cmocka_unit_test(a_valve_passes_what_its_capacity_and_the_waves_allow),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
