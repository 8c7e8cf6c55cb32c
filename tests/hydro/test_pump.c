#include "kent_pump.h"
#include "kent_check.h"
#include "kent_suter.h"

#include <math.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double DENSITY = 1000.0, GRAVITY = 9.81;

static const double SPEEDS[] = {10.0, 25.0, 60.0, 146.9, 147.0, 200.0, 261.0, 300.0};
enum { SPEED_COUNT = sizeof SPEEDS / sizeof SPEEDS[0] };

/* 200 L/s at 50 m, 84 %; its speed is what makes its specific speed. The shape is that
 * of no pump in particular. */
static kent_pump_curve pump_of(double specific_speed, bool with_efficiency)
{
    const double share[] = {0.0, 0.5, 1.0, 1.25, 1.5};
    const double head[] = {62.5, 59.0, 50.0, 42.5, 31.0};
    const double efficiency[] = {0.0, 0.68, 0.84, 0.80, 0.66};
    kent_pump_curve c = {.count = 5,
                         .rated_flow = 0.2,
                         .rated_head = 50.0,
                         .rated_efficiency = 0.84,
                         .stages = 1,
                         .suctions = 1};
    for (size_t i = 0; i < c.count; i++) {
        c.flow[i] = share[i] * c.rated_flow;
        c.head[i] = head[i];
        c.efficiency[i] = with_efficiency ? efficiency[i] : NAN;
    }
    c.rated_speed =
        specific_speed * pow(c.rated_head, 0.75) / sqrt(c.rated_flow) * PI / 30.0;
    assert_null(kent_pump_curve_complete(&c, DENSITY, GRAVITY));
    return c;
}

static kent_pump_point at_shares(const kent_pump_curve *c, double v, double alpha)
{
    return kent_pump_at(c, v * c->rated_flow, alpha * c->rated_speed);
}

/* Head and torque over their rated values, and over alpha2 + v2, at Suter's angle x. */
static kent_pump_point suter_at(const kent_pump_curve *c, double x)
{
    kent_pump_point p = at_shares(c, sin(x - PI), cos(x - PI));
    p.head /= c->rated_head;
    p.torque /= c->rated_torque;
    return p;
}

/* ---- the published tables -------------------------------------------------------- */

/* Wylie and Streeter 1993, appendix; Chaudhry 1987, appendix E (from memory) */
static void the_tables_close_and_pass_rated_and_shut_off_points(void **state)
{
    (void)state;
    const double shut_head[] = {1.288, 1.970, 2.750},
                 shut_torque[] = {0.450, 1.490, 1.950};
    const double speed[] = {25.0, 147.0, 261.0};
    for (size_t i = 0; i < KENT_SUTER_CURVES; i++) {
        const kent_suter *s = &KENT_SUTER[i];
        assert_close(s->specific_speed, speed[i], 0.0);
        assert_close(s->wh[0], s->wh[KENT_SUTER_POINTS - 1], 0.0);
        assert_close(s->wb[0], s->wb[KENT_SUTER_POINTS - 1], 0.0);
        assert_close(s->wh[55], 0.500, 0.0);
        assert_close(s->wb[55], 0.500, 0.0);
        assert_close(s->wh[44], shut_head[i], 0.0);
        assert_close(s->wb[44], shut_torque[i], 0.0);
    }
}

/* Heads and torques that change sign between two of the published points: the pump
 * must do so between the same two. */
static void it_changes_sign_where_the_tables_do(void **state)
{
    (void)state;
    for (size_t i = 0; i < KENT_SUTER_CURVES; i++) {
        const kent_suter *s = &KENT_SUTER[i];
        const kent_pump_curve c = pump_of(s->specific_speed, false);
        size_t changes = 0;
        for (size_t k = 0; k + 1 < KENT_SUTER_POINTS; k++) {
            const double from = (double)k * PI / 44.0, to = (double)(k + 1) * PI / 44.0;
            if (to > PI - 0.25 * PI && from < 1.5 * PI) continue; /* own, blended */
            if (s->wh[k] * s->wh[k + 1] < 0.0) {
                assert_true(suter_at(&c, from).head * suter_at(&c, to).head < 0.0);
                changes++;
            }
            if (s->wb[k] * s->wb[k + 1] < 0.0) {
                assert_true(suter_at(&c, from).torque * suter_at(&c, to).torque < 0.0);
                changes++;
            }
        }
        assert_true(changes > 0);
    }
}

static void elsewhere_it_is_the_table(void **state)
{
    (void)state;
    for (size_t i = 0; i < KENT_SUTER_CURVES; i++) {
        const kent_suter *s = &KENT_SUTER[i];
        const kent_pump_curve c = pump_of(s->specific_speed, true);
        for (size_t k = 0; k < KENT_SUTER_POINTS; k++) {
            const double x = (double)k * PI / 44.0;
            if (x > 0.75 * PI + 1e-9 && x < 1.5 * PI - 1e-9) continue;
            assert_within(suter_at(&c, x).head, s->wh[k], 1e-13);
            assert_within(suter_at(&c, x).torque, s->wb[k], 1e-13);
        }
    }
}

/* Halfway between two published specific speeds: halfway between the curves. */
static void specific_speeds_between_are_interpolated(void **state)
{
    (void)state;
    const kent_pump_curve c = pump_of(204.0, false);
    assert_close(c.specific_speed, 204.0, 1e-13);
    assert_false(c.outside);
    for (size_t k = 0; k < KENT_SUTER_POINTS; k++) {
        assert_within(c.wh[k], 0.5 * (KENT_SUTER[1].wh[k] + KENT_SUTER[2].wh[k]),
                      1e-13);
        assert_within(c.wb[k], 0.5 * (KENT_SUTER[1].wb[k] + KENT_SUTER[2].wb[k]),
                      1e-13);
    }
}

static void outside_the_range_the_nearest_is_taken_and_said(void **state)
{
    (void)state;
    char text[300];
    const kent_pump_curve low = pump_of(12.0, false), high = pump_of(400.0, false);
    assert_true(low.outside && high.outside);
    assert_memory_equal(low.wh, KENT_SUTER[0].wh, sizeof low.wh);
    assert_memory_equal(high.wb, KENT_SUTER[2].wb, sizeof high.wb);
    kent_pump_caution(&low, text, sizeof text);
    assert_non_null(strstr(text, "specific speed of 12 "));
    assert_non_null(strstr(text, "25 to 261"));
    assert_non_null(strstr(text, "of a pump of 25"));
    kent_pump_caution(&high, text, sizeof text);
    assert_non_null(strstr(text, "of a pump of 261"));
    assert_false(pump_of(25.0 + 1e-9, false).outside);
}

static void specific_speed_is_of_one_stage_and_one_suction_side(void **state)
{
    (void)state;
    kent_pump_curve c = pump_of(40.0, false);
    c.stages = 4;
    assert_null(kent_pump_curve_complete(&c, DENSITY, GRAVITY));
    assert_close(c.specific_speed, 40.0 * pow(4.0, 0.75), 1e-13);
    c.stages = 1;
    c.suctions = 2;
    assert_null(kent_pump_curve_complete(&c, DENSITY, GRAVITY));
    assert_close(c.specific_speed, 40.0 / sqrt(2.0), 1e-13);
}

/* ---- its own curve --------------------------------------------------------------- */

static void its_own_points_are_met(void **state)
{
    (void)state;
    for (size_t s = 0; s < SPEED_COUNT; s++) {
        const kent_pump_curve c = pump_of(SPEEDS[s], true);
        for (size_t i = 0; i < c.count; i++) {
            const kent_pump_point p = kent_pump_at(&c, c.flow[i], c.rated_speed);
            assert_close(p.head, c.head[i], 1e-13);
            if (i == 0) continue;
            assert_close(p.torque * c.rated_speed,
                         DENSITY * GRAVITY * c.flow[i] * c.head[i] / c.efficiency[i],
                         1e-13);
        }
    }
}

static void the_rated_point_is_met_without_efficiencies_too(void **state)
{
    (void)state;
    for (size_t s = 0; s < SPEED_COUNT; s++) {
        const kent_pump_curve c = pump_of(SPEEDS[s], false);
        const kent_pump_point p = kent_pump_at(&c, c.rated_flow, c.rated_speed);
        assert_close(p.head, 50.0, 1e-13);
        assert_close(p.torque, c.rated_torque, 1e-12);
        assert_close(c.rated_torque * c.rated_speed,
                     DENSITY * GRAVITY * 0.2 * 50.0 / 0.84, 1e-14);
    }
}

/* Shut-off torque where efficiencies say nothing of it: the tables' */
static void shut_off_torque_is_the_tables(void **state)
{
    (void)state;
    const double want[] = {0.450, 1.490, 1.950};
    for (size_t i = 0; i < KENT_SUTER_CURVES; i++) {
        for (int own = 0; own < 2; own++) {
            const kent_pump_curve c = pump_of(KENT_SUTER[i].specific_speed, own == 1);
            assert_close(kent_pump_at(&c, 0.0, c.rated_speed).torque,
                         want[i] * c.rated_torque, 1e-12);
        }
    }
}

static void two_points_make_a_parabola(void **state)
{
    (void)state;
    kent_pump_curve c = {.count = 2,
                         .flow = {0.0, 0.3},
                         .head = {60.0, 42.0},
                         .efficiency = {NAN, NAN},
                         .rated_flow = 0.2,
                         .rated_head = 52.0,
                         .rated_efficiency = 0.8,
                         .rated_speed = 150.0,
                         .stages = 1,
                         .suctions = 1};
    assert_null(kent_pump_curve_complete(&c, DENSITY, GRAVITY));
    for (int k_q = 0; k_q < 31; k_q++) {
        const double q = 0.01 * k_q;
        assert_close(kent_pump_at(&c, q, 150.0).head, 60.0 - 200.0 * q * q, 1e-13);
    }
}

/* Laws of affinity: flow with speed, head and torque with its square. */
static void the_laws_of_affinity_hold_everywhere(void **state)
{
    (void)state;
    const double factors[] = {0.05, 0.4, 1.7, 30.0};
    const kent_pump_curve c = pump_of(90.0, true);
    for (int k_x = 0; k_x < 628; k_x++) {
        const double x = 0.005 + 0.01 * k_x;
        const double v = sin(x - PI), alpha = cos(x - PI);
        const kent_pump_point one = at_shares(&c, v, alpha);
        for (size_t i = 0; i < 4; i++) {
            const double k = factors[i];
            const kent_pump_point p = at_shares(&c, k * v, k * alpha);
            assert_within(p.head, k * k * one.head, 1e-12 * k * k * c.rated_head);
            assert_within(p.torque, k * k * one.torque, 1e-12 * k * k * c.rated_torque);
            assert_within(p.head_by_flow, k * one.head_by_flow,
                          1e-10 * k * c.rated_head / c.rated_flow);
        }
    }
}

/* At rated speed, from shut-off to twice the rated flow */
static void head_never_rises_with_flow_while_it_pumps(void **state)
{
    (void)state;
    for (size_t s = 0; s < SPEED_COUNT; s++) {
        const kent_pump_curve c = pump_of(SPEEDS[s], true);
        for (int k_v = 0; k_v < 2000; k_v++) {
            const double v = 0.001 * k_v;
            assert_true(at_shares(&c, v, 1.0).head_by_flow <= 0.0);
        }
    }
}

/* ---- joins ----------------------------------------------------------------------- */

static void assert_joined(const kent_pump_curve *c, double x)
{
    const double step = 1e-12;
    for (int k_size = 0; k_size < 5; k_size++) {
        const double size = 0.1 * pow(2.0, k_size);
        const double before = x - step - PI, after = x + step - PI;
        const kent_pump_point a = at_shares(c, size * sin(before), size * cos(before));
        const kent_pump_point b = at_shares(c, size * sin(after), size * cos(after));
        const double by_flow = c->rated_flow / c->rated_head;
        const double by_speed = c->rated_speed / c->rated_head;
        const double torque_by_flow = c->rated_flow / c->rated_torque;
        const double torque_by_speed = c->rated_speed / c->rated_torque;
        assert_within(a.head, b.head, 1e-9 * c->rated_head);
        assert_within(a.torque, b.torque, 1e-9 * c->rated_torque);
        assert_within(a.head_by_flow * by_flow, b.head_by_flow * by_flow, 1e-9);
        assert_within(a.head_by_speed * by_speed, b.head_by_speed * by_speed, 1e-9);
        assert_within(a.torque_by_flow * torque_by_flow,
                      b.torque_by_flow * torque_by_flow, 1e-9);
        assert_within(a.torque_by_speed * torque_by_speed,
                      b.torque_by_speed * torque_by_speed, 1e-9);
    }
}

static void own_curve_and_table_join_without_a_jump(void **state)
{
    (void)state;
    for (int k_ns = 0; k_ns < 38; k_ns++) {
        const double ns = 15.0 + 7.3 * k_ns;
        for (int own = 0; own < 2; own++) {
            const kent_pump_curve c = pump_of(ns, own == 1);
            assert_joined(&c, PI);
            assert_joined(&c, c.last_angle);
            assert_joined(&c, 0.75 * PI); /* where the blending ends */
            assert_joined(&c, 1.5 * PI);
            for (size_t k = 1; k < KENT_SUTER_POINTS - 1; k += 7) {
                assert_joined(&c, (double)k * PI / 44.0);
            }
        }
    }
}

/* A flow so small that its angle is rounded to that of none. */
static void a_breath_of_reverse_flow_changes_nothing(void **state)
{
    (void)state;
    for (int k_ns = 0; k_ns < 38; k_ns++) {
        const double ns = 15.0 + 7.3 * k_ns;
        const kent_pump_curve c = pump_of(ns, true);
        const kent_pump_point none = kent_pump_at(&c, 0.0, c.rated_speed);
        for (int k_q = 0; k_q < 16; k_q++) {
            const double q = 1e-30 * pow(10.0, k_q);
            const kent_pump_point back =
                kent_pump_at(&c, -q * c.rated_flow, c.rated_speed);
            assert_within(back.head, none.head, 1e-9 * c.rated_head);
            assert_within(back.torque, none.torque, 1e-9 * c.rated_torque);
        }
    }
}

/* In every quadrant power that goes in, by the shaft or by the water, is no less than
 * what comes out: for four shapes of the own curve, flat and steep, with efficiencies
 * of its own or the rated one alone. (Tables scaled to a rated efficiency below 0.65
 * turn as a better turbine than they pump; nothing is claimed there.) */
static void it_never_gives_more_than_it_gets(void **state)
{
    (void)state;
    const double heads[4][5] = {{62.5, 59.0, 50.0, 42.5, 31.0},
                                {55.0, 54.0, 50.0, 46.0, 41.0},
                                {90.0, 72.0, 50.0, 37.0, 22.0},
                                {75.0, 65.0, 50.0, 40.0, 27.0}};
    for (int shape = 0; shape < 8; shape++) {
        for (int k_e = 0; k_e < 4; k_e++) {
            const double e = 0.65 + 0.09 * k_e;
            for (int k_ns = 0; k_ns < 15; k_ns++) {
                const double ns = 15.0 + 20.0 * k_ns;
                kent_pump_curve c = pump_of(ns, shape % 2 == 1);
                c.rated_efficiency = e;
                for (size_t i = 0; i < 5; i++) {
                    c.head[i] = heads[shape / 2][i];
                    c.efficiency[i] *= e / 0.84;
                }
                assert_null(kent_pump_curve_complete(&c, DENSITY, GRAVITY));
                for (int k_x = 0; k_x < 1257; k_x++) {
                    const double x = 0.005 * k_x;
                    const double flow = c.rated_flow * sin(x - PI);
                    const double speed = c.rated_speed * cos(x - PI);
                    const kent_pump_point p = kent_pump_at(&c, flow, speed);
                    assert_true(p.torque * speed > DENSITY * GRAVITY * flow * p.head);
                }
            }
        }
    }
}

/* Where speed and flow turn the corner of Suter's angle */
static void the_angle_closes_round(void **state)
{
    (void)state;
    const kent_pump_curve c = pump_of(110.0, true);
    const kent_pump_point a = at_shares(&c, 1e-13, -1.0),
                          b = at_shares(&c, -1e-13, -1.0);
    assert_within(a.head, b.head, 1e-9 * c.rated_head);
    assert_within(a.torque, b.torque, 1e-9 * c.rated_torque);
    assert_within(a.head_by_flow, b.head_by_flow, 1e-9 * c.rated_head / c.rated_flow);
}

static void derivatives_are_those_of_differences(void **state)
{
    (void)state;
    const double step = 1e-6;
    for (size_t s = 0; s < SPEED_COUNT; s++) {
        const kent_pump_curve c = pump_of(SPEEDS[s], s % 2 == 0);
        const double q = step * c.rated_flow, w = step * c.rated_speed;
        for (int k_x = 0; k_x < 368; k_x++) {
            const double x = 0.003 + 0.0171 * k_x;
            for (int k_size = 0; k_size < 3; k_size++) {
                const double size = 0.2 * pow(3.0, k_size);
                const double flow = size * sin(x - PI) * c.rated_flow;
                const double speed = size * cos(x - PI) * c.rated_speed;
                const kent_pump_point p = kent_pump_at(&c, flow, speed);
                const kent_pump_point a = kent_pump_at(&c, flow - q, speed);
                const kent_pump_point b = kent_pump_at(&c, flow + q, speed);
                const kent_pump_point d = kent_pump_at(&c, flow, speed - w);
                const kent_pump_point e = kent_pump_at(&c, flow, speed + w);
                const double tolerance = 2e-4; /* a cubic's second derivative jumps */
                assert_within(p.head_by_flow * q / step,
                              (b.head - a.head) / (2.0 * step),
                              tolerance * c.rated_head);
                assert_within(p.head_by_speed * w / step,
                              (e.head - d.head) / (2.0 * step),
                              tolerance * c.rated_head);
                assert_within(p.torque_by_flow * q / step,
                              (b.torque - a.torque) / (2.0 * step),
                              tolerance * c.rated_torque);
                assert_within(p.torque_by_speed * w / step,
                              (e.torque - d.torque) / (2.0 * step),
                              tolerance * c.rated_torque);
            }
        }
    }
}

static void it_is_finite_everywhere(void **state)
{
    (void)state;
    const double sizes[] = {0.0, 5e-324, 1e-200, 1e-12, 1.0, 1e12, 1e100};
    const kent_pump_curve c = pump_of(60.0, true);
    for (size_t i = 0; i < 7; i++) {
        for (size_t k = 0; k < 7; k++) {
            for (int sign = 0; sign < 4; sign++) {
                const double v = sign & 1 ? -sizes[i] : sizes[i];
                const double alpha = sign & 2 ? -sizes[k] : sizes[k];
                const kent_pump_point p = at_shares(&c, v, alpha);
                assert_true(isfinite(p.head) && isfinite(p.torque));
                assert_true(isfinite(p.head_by_flow) && isfinite(p.head_by_speed));
                assert_true(isfinite(p.torque_by_flow) && isfinite(p.torque_by_speed));
            }
        }
    }
    const kent_pump_point rest = kent_pump_at(&c, 0.0, 0.0);
    assert_true(rest.head == 0.0 && rest.torque == 0.0);
}

/* ---- inertia --------------------------------------------------------------------- */

/* A. R. D. Thorley, Fluid Transients in Pipeline Systems: pump term seen, motor term
 * from memory. kW, rpm, kg m2 to three places */
static void inertia_is_the_regressions(void **state)
{
    (void)state;
    const double rows[][3] = {
        {5, 1450, 0.087},    {15, 1450, 0.309},  {30, 1450, 0.714},
        {55, 1450, 1.528},   {90, 1450, 2.885},  {160, 1480, 5.948},
        {250, 1480, 10.882}, {400, 985, 43.143}, {800, 985, 110.102},
        {37, 2900, 0.242},   {75, 2950, 0.62},
    };
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        assert_within(
            kent_pump_inertia_estimate(1e3 * rows[i][0], rows[i][1] * PI / 30.0),
            rows[i][2], 0.51e-3);
    }
}

/* 200 kW at 1480 rpm with 20 kg m2: derived from dw/dt = -T/I */
static void a_tripped_pump_starts_to_slow_by_its_rated_torque(void **state)
{
    (void)state;
    const double speed = 1480.0 * PI / 30.0, inertia = 20.0, efficiency = 0.8;
    const double head = 40.0;
    const double flow = 200e3 * efficiency / (DENSITY * GRAVITY * head);
    kent_pump_curve c = {.count = 3,
                         .flow = {0.0, flow, 1.4 * flow},
                         .head = {50.0, head, 28.0},
                         .efficiency = {NAN, NAN, NAN},
                         .rated_flow = flow,
                         .rated_head = head,
                         .rated_efficiency = efficiency,
                         .rated_speed = speed,
                         .stages = 1,
                         .suctions = 1};
    assert_null(kent_pump_curve_complete(&c, DENSITY, GRAVITY));
    const double torque = kent_pump_at(&c, flow, speed).torque;
    assert_close(-torque / inertia * 30.0 / PI, -616.1, 1e-4);
    assert_close(inertia * speed / torque, 2.402, 1e-4);
}

/* ---- refusals -------------------------------------------------------------------- */

static void assert_refused(kent_pump_curve c, const char *text)
{
    const char *wrong = kent_pump_curve_complete(&c, DENSITY, GRAVITY);
    assert_non_null(wrong);
    assert_string_equal(wrong, text);
}

static void curves_that_cannot_be_are_refused(void **state)
{
    (void)state;
    const kent_pump_curve good = pump_of(60.0, true);
    kent_pump_curve c = good;
    c.count = 1;
    assert_refused(c, "its curve needs at least two pairs");
    c = good, c.flow[0] = 0.01;
    assert_refused(c, "its curve does not start at no flow");
    c = good, c.head[0] = 0.0;
    assert_refused(c, "its head is not above nil at no flow");
    c = good, c.flow[2] = c.flow[1];
    assert_refused(c, "its flows do not rise");
    c = good, c.head[2] = c.head[1] + 0.1;
    assert_refused(c, "its head rises with flow");
    c = good, c.efficiency[2] = 1.1;
    assert_refused(c, "an efficiency of its curve is not above 0 and at most 1");
    c = good, c.efficiency[2] = NAN;
    assert_refused(c, "its efficiency is given at some flows of its curve only");
    c = good, c.rated_efficiency = 0.0;
    assert_refused(c, "its rated efficiency is not above 0 and at most 1");
    c = good, c.rated_head = 0.0;
    assert_refused(c, "its rated flow, head and speed are not all above nil");
    c = good, c.rated_flow = 0.31;
    assert_refused(c, "its rated flow is beyond the end of its curve");
    c = good, c.rated_head = 53.0;
    assert_refused(c, "its rated point is not on its curve");
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_tables_close_and_pass_rated_and_shut_off_points),
        cmocka_unit_test(it_changes_sign_where_the_tables_do),
        cmocka_unit_test(elsewhere_it_is_the_table),
        cmocka_unit_test(specific_speeds_between_are_interpolated),
        cmocka_unit_test(outside_the_range_the_nearest_is_taken_and_said),
        cmocka_unit_test(specific_speed_is_of_one_stage_and_one_suction_side),
        cmocka_unit_test(its_own_points_are_met),
        cmocka_unit_test(the_rated_point_is_met_without_efficiencies_too),
        cmocka_unit_test(shut_off_torque_is_the_tables),
        cmocka_unit_test(two_points_make_a_parabola),
        cmocka_unit_test(the_laws_of_affinity_hold_everywhere),
        cmocka_unit_test(head_never_rises_with_flow_while_it_pumps),
        cmocka_unit_test(own_curve_and_table_join_without_a_jump),
        cmocka_unit_test(a_breath_of_reverse_flow_changes_nothing),
        cmocka_unit_test(it_never_gives_more_than_it_gets),
        cmocka_unit_test(the_angle_closes_round),
        cmocka_unit_test(derivatives_are_those_of_differences),
        cmocka_unit_test(it_is_finite_everywhere),
        cmocka_unit_test(inertia_is_the_regressions),
        cmocka_unit_test(a_tripped_pump_starts_to_slow_by_its_rated_torque),
        cmocka_unit_test(curves_that_cannot_be_are_refused),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
