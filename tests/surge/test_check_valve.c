/* The check valve alone, between a level and a frictionless main. */
#include "kent_flap_internal.h"
#include "pump_rig.h"

#include "kent_check.h"

#include <math.h>
#include <string.h>

static const double GRAVITY = 9.81, AREA = 0.07, WAVE = 1100.0; /* m2, m/s */

/* From 30 m into the main at some flow; the main's waves are the test's. */
static void valve(rig *r, double loss, double delay)
{
    memset(r, 0, sizeof *r);
    r->ops = &KENT_AT_CHECK_VALVE;
    r->valve = (kent_check_valve){
        .id = "NR", .size = 0.25, .loss = loss, .delay = delay, .node = {0, 1}};
}

static double resistance(double loss)
{
    const double area = 0.25 * acos(-1.0) * 0.25 * 0.25;
    return loss / (2.0 * GRAVITY * area * area);
}

/* Starts at a flow, with the head before it that this takes. */
static void start(rig *r, double flow, double step, size_t delay)
{
    r->far_level = 20.0;
    r->pump.suction_level = 20.0 + resistance(r->valve.loss) * flow * fabs(flow);
    r->pump.running = 1;
    rig_start(r, AREA, WAVE, flow, step, delay);
}

static void open_it_loses_what_its_loss_says(void **state)
{
    (void)state;
    static rig r;
    valve(&r, 1.2, 0.0);
    start(&r, 0.1, 0.01, 0);
    for (int i = 0; i < 100; i++) {
        rig_advance(&r);
        assert_close(r.flow, 0.1, 1e-12);
    }
    /* 5 m more before it: k Q2 + Q/Y = what C leaves */
    r.head[0] += 5.0;
    rig_advance(&r);
    const double k = resistance(1.2), c = 20.0 - 0.1 / r.y;
    const double rise = r.head[0] - c;
    const double want =
        2.0 * rise / (1.0 / r.y + sqrt(1.0 / (r.y * r.y) + 4.0 * k * rise));
    assert_close(r.flow, want, 1e-12);
    rig_clear(&r);
}

static void an_ideal_one_shuts_and_opens_by_itself(void **state)
{
    (void)state;
    static rig r;
    valve(&r, 0.5, 0.0);
    start(&r, 0.05, 0.01, 0);
    const double open = r.head[0];
    r.head[0] = open - 100.0; /* more than a V/g takes away */
    rig_advance(&r);
    assert_true(r.flow == 0.0);
    assert_close(r.head[1], 20.0 - 0.05 / r.y, 1e-12);
    rig_advance(&r);
    assert_true(r.flow == 0.0);
    r.head[0] = open;
    rig_advance(&r);
    assert_close(r.flow, 0.05, 1e-10);
    assert_true(rig_told(&r, 0) == 0.0);
    rig_clear(&r);
}

/* Without a delay nothing comes back; with one the flow reverses until then, and its
 * velocity on the valve's size is told. The level before it falls steadily. */
static void a_delayed_one_shuts_so_long_after_reversal(void **state)
{
    (void)state;
    static rig r;
    double stopped = 0.0, reversed = NAN, shut = NAN;
    valve(&r, 0.5, 0.25);
    start(&r, 0.05, 0.01, 0);
    for (int i = 0; i < 200; i++) {
        const double flow = r.flow;
        r.head[0] -= 1.0; /* falls steadily */
        rig_advance(&r);
        if (flow > 0.0 && r.flow < 0.0) {
            reversed = r.time - r.step * r.flow / (r.flow - flow);
        }
        if (flow < 0.0 && r.flow == 0.0) {
            stopped = -flow;
            shut = r.time;
        }
    }
    assert_true(shut >= reversed + 0.25 && shut < reversed + 0.25 + r.step);
    assert_true(r.flow == 0.0); /* and stays so */
    const double area = 0.25 * acos(-1.0) * 0.25 * 0.25;
    assert_close(rig_told(&r, 0), stopped / area, 1e-13);
    r.head[0] = 60.0; /* opens again at once */
    rig_advance(&r);
    assert_true(r.flow > 0.0);
    for (int i = 0; i < 70;
         i++) { /* stops less the second time: the greatest is told */
        if (i == 30) r.head[0] = r.head[1] - r.flow / r.y - 1.0;
        rig_advance(&r);
        assert_true(i < 30   ? r.flow > 0.0
                    : i < 55 ? r.flow < 0.0
                             : i < 57 || r.flow == 0.0);
    }
    assert_close(rig_told(&r, 0), stopped / area, 1e-13);
    rig_clear(&r);
}

/* A flow that turns forward again before the delay is over counts from the start. */
static void a_flow_that_turns_again_is_not_shut_off(void **state)
{
    (void)state;
    static rig r;
    valve(&r, 0.5, 0.25);
    start(&r, 0.05, 0.01, 0);
    const double before = r.head[0];
    for (int i = 0; i < 200; i++) { /* 0.2 s backwards, 0.2 s forwards, ... */
        r.head[0] = before - (i / 20 % 2 == 0 ? 100.0 : 0.0);
        rig_advance(&r);
        assert_true(i / 20 % 2 == 0 ? r.flow < 0.0 : r.flow > 0.0);
    }
    assert_true(rig_told(&r, 0) == 0.0);
    rig_clear(&r);
}

/* What is pushed open for less than its delay lets nothing back; for longer, as before.
 */
static void one_pushed_open_for_a_moment_is_near_its_seat(void **state)
{
    (void)state;
    static rig r;
    valve(&r, 0.5, 0.25);
    start(&r, 0.05, 0.01, 0);
    const double open = r.head[0];
    for (int i = 0; i < 30; i++) { /* 0.25 s back, then shut */
        r.head[0] = open - 100.0;
        rig_advance(&r);
        assert_true(i < 25 ? r.flow < 0.0 : i < 26 || r.flow == 0.0);
    }
    for (int i = 0; i < 60; i++) { /* 0.2 s forwards, 0.3 s; then back */
        const bool back = (i >= 20 && i < 30);
        r.head[0] = back ? open - 100.0 : open;
        rig_advance(&r);
        assert_true(back ? r.flow == 0.0 : r.flow > 0.0);
    }
    r.head[0] = open - 100.0;
    rig_advance(&r);
    assert_true(r.flow < 0.0);
    rig_clear(&r);
}

static void its_law_rises_and_has_its_own_slope(void **state)
{
    (void)state;
    static rig r;
    const double heads[] = {-40.0, 0.0, 0.3, 25.0}, step = 1e-7;
    for (int delayed = 0; delayed < 2; delayed++) {
        valve(&r, 1.0, delayed ? 0.5 : 0.0);
        start(&r, 0.05, 0.01, 0);
        for (size_t i = 0; i < 4; i++) {
            for (int k_q = 0; k_q < 292; k_q++) {
                const double q = -0.2 + 0.00137 * k_q;
                const double head[2] = {20.0 + heads[i], 20.0};
                const kent_device_law l = r.ops->law(&r.state, q, head);
                const double a = r.ops->law(&r.state, q - step, head).f;
                const double b = r.ops->law(&r.state, q + step, head).f;
                assert_within(l.by_flow, (b - a) / (2.0 * step),
                              1e-3 * fabs(l.by_flow) + 1e-3);
                assert_true(l.by_flow >= 0.0 && l.by_head[0] <= 0.0);
                assert_true(l.by_head[1] >= 0.0);
            }
        }
        rig_clear(&r);
    }
}

static void a_delay_of_nil_is_an_ideal_one(void **state)
{
    (void)state;
    const kent_flap f = kent_flap_new(KENT_CHECK_DELAYED, 0.0, 0.1);
    assert_int_equal(f.kind, KENT_CHECK_IDEAL);
    assert_true(kent_flap_is_one_way(&f));
    const kent_flap open = kent_flap_new(KENT_CHECK_DELAYED, 0.1, 0.1);
    const kent_flap shut = kent_flap_new(KENT_CHECK_DELAYED, 0.1, 0.0);
    assert_false(kent_flap_is_one_way(&open));
    assert_true(kent_flap_is_one_way(&shut));
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(open_it_loses_what_its_loss_says),
        cmocka_unit_test(an_ideal_one_shuts_and_opens_by_itself),
        cmocka_unit_test(a_delayed_one_shuts_so_long_after_reversal),
        cmocka_unit_test(a_flow_that_turns_again_is_not_shut_off),
        cmocka_unit_test(one_pushed_open_for_a_moment_is_near_its_seat),
        cmocka_unit_test(its_law_rises_and_has_its_own_slope),
        cmocka_unit_test(a_delay_of_nil_is_an_ideal_one),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
