#include "kent_hollow_internal.h"

#include "kent_check.h"

#include <stddef.h>

/* 0 .. 1, by a plain congruence: the same on every machine. */
static double draw(unsigned *seed)
{
    *seed = *seed * 1664525U + 1013904223U;
    return (double)(*seed >> 8) / 16777216.0;
}

/* From 10^low to 10^high. */
static double draw_size(unsigned *seed, double low, double high)
{
    return pow(10.0, low + (high - low) * draw(seed));
}

/* 15.5: both equations, whatever comes. */
static void gas_keeps_its_law_and_the_water_its_volume(void **state)
{
    (void)state;
    unsigned seed = 1;
    for (int i = 0; i < 200000; i++) {
        const double rest = (draw(&seed) - 0.5) * draw_size(&seed, -6.0, 3.5);
        const double volume = draw_size(&seed, -14.0, 0.0);
        const double room = draw_size(&seed, -9.0, 0.0);
        const double gas = draw_size(&seed, -14.0, -3.0);
        const kent_hollow_end end = kent_hollow_step(rest, volume, room, gas);
        assert_true(end.rise > 0.0 && end.volume > 0.0);
        assert_close(end.rise * end.volume, gas, 1e-14);
        const double scale = volume + room * fabs(rest) + end.volume;
        assert_within(end.volume, volume + room * (end.rise - rest), 2e-15 * scale);
    }
}

/* Without gas: either there is a cavity or there is pressure, and no water is lost. */
static void vapour_is_there_or_the_head_is_higher(void **state)
{
    (void)state;
    unsigned seed = 2;
    int open = 0;
    for (int i = 0; i < 200000; i++) {
        const double rest = (draw(&seed) - 0.5) * draw_size(&seed, -6.0, 3.5);
        const double volume = i % 3 ? draw_size(&seed, -14.0, 0.0) : 0.0;
        const double room = draw_size(&seed, -9.0, 0.0);
        const kent_hollow_end end = kent_hollow_step(rest, volume, room, 0.0);
        assert_true(end.rise >= 0.0 && end.volume >= 0.0);
        assert_true(end.rise == 0.0 || end.volume == 0.0);
        const double scale = volume + room * fabs(rest);
        assert_within(end.volume, volume + room * (end.rise - rest), 2e-15 * scale);
        open += end.volume > 0.0;
    }
    assert_in_range(open, 1000, 199000);
    const kent_hollow_end none = kent_hollow_step(0.0, 0.0, 1e-4, 0.0);
    assert_true(none.rise == 0.0 && none.volume == 0.0 && none.slope == 1.0);
}

static void the_slope_is_that_of_the_head(void **state)
{
    (void)state;
    for (int i = -40; i <= 40; i++) {
        const double rest = i + 0.5, step = 1e-5;
        const kent_hollow_end at = kent_hollow_step(rest, 1e-4, 1e-4, 1e-6);
        const kent_hollow_end low = kent_hollow_step(rest - step, 1e-4, 1e-4, 1e-6);
        const kent_hollow_end high = kent_hollow_step(rest + step, 1e-4, 1e-4, 1e-6);
        assert_within(at.slope, (high.rise - low.rise) / (2.0 * step), 1e-8);
        assert_true(at.slope >= 0.0 && at.slope <= 1.0);
    }
}

/* 7.18 with the heads of the hollows on both sides, whichever way it flows. */
static void a_valve_between_hollows_keeps_its_law(void **state)
{
    (void)state;
    unsigned seed = 3;
    for (int i = 0; i < 20000; i++) {
        kent_hollow hollow[2];
        kent_hollow_side side[2];
        for (int s = 0; s < 2; s++) {
            const double y = draw_size(&seed, -4.0, -1.0); /* m2/s */
            hollow[s] = (kent_hollow){-10.0 + 5.0 * draw(&seed), 0.01 * y, 1.0 / y,
                                      i % 2 ? draw_size(&seed, -9.0, -5.0) : 0.0,
                                      i % 3 ? draw_size(&seed, -9.0, -3.0) : 0.0};
            side[s] = (kent_hollow_side){&hollow[s], 120.0 * (draw(&seed) - 0.4), y};
        }
        if (i % 5 == 0) side[1].hollow = NULL; /* into a level */
        const double capacity = draw_size(&seed, -4.0, 0.0);
        const double flow = kent_hollow_gate(capacity, side);
        double by = 0.0;
        const double drop = kent_hollow_head(&side[0], flow, &by) -
                            kent_hollow_head(&side[1], -flow, &by);
        assert_within(flow * fabs(flow) / (capacity * capacity), drop, 1e-9);
    }
    kent_hollow shut = {-10.0, 1e-4, 100.0, 0.0, 1e-3};
    const kent_hollow_side side[2] = {{&shut, 20.0, 0.01}, {NULL, 50.0, 0.0}};
    assert_true(kent_hollow_gate(0.0, side) == 0.0);
}

static void an_outflow_draws_what_the_pressure_allows(void **state)
{
    (void)state;
    unsigned seed = 4;
    int part = 0;
    for (int i = 0; i < 20000; i++) {
        const double y = draw_size(&seed, -4.0, -1.0), full = i % 2 ? 20.0 : 0.0;
        const kent_hollow hollow = {-10.0, 0.01 * y, 1.0 / y, 1e-8, 1e-7};
        const kent_hollow_side side = {&hollow, 100.0 * (draw(&seed) - 0.4), y};
        const double wanted = draw_size(&seed, -4.0, 0.0);
        const double flow = kent_hollow_draw(wanted, 0.5, full, &side);
        double by = 0.0;
        const double head = kent_hollow_head(&side, flow, &by) - 0.5; /* above z */
        assert_true(flow >= 0.0 && flow <= wanted);
        if (flow == 0.0) {
            assert_true(head <= 1e-9);
        } else if (flow == wanted) {
            assert_true(head >= full - 1e-9);
        } else {
            const double share = flow / wanted;
            assert_within(head, full * share * share, 1e-9);
            part++;
        }
    }
    assert_true(part > 1000);
    const kent_hollow hollow = {-10.0, 1e-4, 100.0, 0.0, 0.0};
    const kent_hollow_side side = {&hollow, -50.0, 0.01};
    assert_true(kent_hollow_draw(-0.2, 0.5, 0.0, &side) == -0.2); /* feeds the main */
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(gas_keeps_its_law_and_the_water_its_volume),
        cmocka_unit_test(vapour_is_there_or_the_head_is_higher),
        cmocka_unit_test(the_slope_is_that_of_the_head),
        cmocka_unit_test(a_valve_between_hollows_keeps_its_law),
        cmocka_unit_test(an_outflow_draws_what_the_pressure_allows),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
