/* An air valve, alone at the end of a pipe that never answers. */
#include "lone.h"

#include <math.h>
#include <string.h>

static const double G = 9.81, PI = 3.14159265358979323846;
static const double ATMOSPHERE = 101325.0, WATER = 288.15; /* Pa, K */
static const double Y = 0.02; /* m2/s: a main of about 0.5 m */
static const double Z = 10.0; /* m, its level */

static kent_air_valve valve_of(double admission, double release)
{
    return (kent_air_valve){.id = "A1",
                            .point = 0,
                            .in_parallel = 1,
                            .admission_orifice = admission,
                            .release_orifice = release,
                            .admission_coefficient = 0.6,
                            .release_coefficient = 0.7,
                            .switch_pressure = (double)NAN,
                            .switched_orifice = (double)NAN,
                            .place = {0, 7}};
}

static void valve_new(lone *l, kent_air_valve *valve, double step)
{
    lone_new(l, &KENT_AT_AIR_VALVE, Z);
    l->model.air_valves = valve;
    lone_start(l, 0.0, 30.0, 0.0, step);
}

static double absolute(const lone *l)
{
    return ATMOSPHERE + 1000.0 * G * (l->head[0] - Z);
}

/* kg: p V = m R T */
static double mass_of(const lone *l)
{
    return absolute(l) * lone_told(l, 0) / (287.05287 * WATER);
}

/* Every step: mass by the gas law grows by what the orifice lets through, volume by
 * what the water leaves. */
static void air_and_water_are_both_counted(void **state)
{
    (void)state;
    lone l;
    kent_air_valve valve = valve_of(0.08, 0.02);
    valve_new(&l, &valve, 0.01);
    const kent_orifice hole = {0.6 * 0.25 * PI * 0.0064, 0.7 * 0.25 * PI * 0.0004,
                               ATMOSPHERE, WATER};
    double let_in = 0.0, let_out = 0.0;
    bool closed = false;
    for (int i = 0; i < 20000 && !closed; i++) {
        const double mass = mass_of(&l), volume = lone_told(&l, 0);
        lone_beside(&l, i < 1000 ? -5.0 : 30.0, Y);
        const double rate = kent_air_through(&hole, absolute(&l)).mass;
        if (i > 1000 && lone_told(&l, 0) == 0.0) {
            closed = true;
            break;
        }
        assert_within(lone_told(&l, 0), volume - 0.01 * l.flow, 1e-9);
        assert_within(mass_of(&l), mass + 0.01 * rate, 1e-8);
        assert_within(lone_told(&l, 1), absolute(&l) - ATMOSPHERE, 1e-6);
        *(rate > 0.0 ? &let_in : &let_out) += 0.01 * rate;
    }
    assert_true(closed);
    assert_true(let_in > 0.5);            /* kg */
    assert_close(let_in, -let_out, 2e-3); /* but what left in the last step */
    lone_clear(&l);
}

static void it_is_shut_while_there_is_pressure_and_no_air(void **state)
{
    (void)state;
    lone l;
    kent_air_valve valve = valve_of(0.15, 0.01);
    valve_new(&l, &valve, 0.01);
    for (int i = 0; i < 100; i++) {
        const double c = 10.0 + 0.5 * i; /* m, from its own level up */
        lone_beside(&l, c, Y);
        assert_true(l.flow == 0.0 && l.head[0] == c && lone_told(&l, 0) == 0.0);
    }
    lone_clear(&l);
}

/* A wide one keeps the head near its level; without one the head would be -5 m. */
static void a_wide_one_breaks_the_vacuum(void **state)
{
    (void)state;
    lone l;
    kent_air_valve valve = valve_of(0.3, 0.01);
    valve_new(&l, &valve, 0.01);
    for (int i = 0; i < 500; i++) {
        lone_beside(&l, -5.0, Y);
        assert_true(l.head[0] < Z && l.head[0] > Z - 0.3);
    }
    /* 0.3 m3/s of water leave; the same of air comes: dp = (rho_air/2) (Q/CA)^2 */
    const double speed = 0.3 / (0.6 * 0.25 * PI * 0.09);
    const double density = ATMOSPHERE / (287.05287 * WATER);
    assert_close(Z - l.head[0], 0.5 * density * speed * speed / (1000.0 * G), 0.02);
    lone_clear(&l);
}

/* A narrow one is choked: rate of mass 0.6847 p0/sqrt(R T), whatever the vacuum. */
static void a_narrow_one_is_choked(void **state)
{
    (void)state;
    lone l;
    kent_air_valve valve = valve_of(0.02, 0.01);
    valve_new(&l, &valve, 0.01);
    for (int i = 0; i < 200; i++) {
        const double before = mass_of(&l);
        lone_beside(&l, 0.0 - 5.0, Y);
        if (absolute(&l) > 0.52 * ATMOSPHERE) continue;
        const double rate =
            0.6 * 0.25 * PI * 0.0004 * 0.684731 * ATMOSPHERE / sqrt(287.05287 * WATER);
        assert_close((mass_of(&l) - before) / 0.01, rate, 1e-5);
    }
    assert_true(absolute(&l) > 1000.0);
    lone_clear(&l);
}

/* With nothing to let it out the pocket is pressed together at one temperature. */
static void what_cannot_leave_is_pressed_by_boyles_law(void **state)
{
    (void)state;
    lone l;
    kent_air_valve valve = valve_of(0.15, 0.0);
    valve_new(&l, &valve, 0.01);
    for (int i = 0; i < 100; i++) {
        lone_beside(&l, -5.0, Y);
    }
    for (int i = 0; i < 20 || l.head[0] < Z; i++) {
        lone_beside(&l, 12.0, Y);
    }
    const double product = absolute(&l) * lone_told(&l, 0);
    for (int i = 0; i < 3000; i++) {
        lone_beside(&l, 90.0, Y);
        assert_close(absolute(&l) * lone_told(&l, 0), product, 1e-8);
    }
    assert_within(l.head[0], 90.0, 0.1);
    lone_clear(&l);
}

typedef struct slam {
    double arrives;       /* m3/s before the last air leaves */
    double before, after; /* m, heads before it and once it is shut */
    double at;            /* s */
} slam;

static slam slams(kent_air_valve *valve, double step)
{
    lone l;
    slam s = {0};
    valve_new(&l, valve, step);
    const int turn = (int)lround(2.0 / step);
    for (int i = 0; i < 400 * turn; i++) {
        if (i > turn) {
            s.arrives = l.flow;
            s.before = l.head[0];
        }
        lone_beside(&l, i < turn ? -5.0 : 30.0, Y);
        if (i > turn && lone_told(&l, 0) == 0.0) break;
    }
    s.at = l.time;
    lone_beside(&l, 30.0, Y);
    assert_true(l.flow == 0.0);
    s.after = l.head[0];
    lone_clear(&l);
    return s;
}

/* As the last air leaves the flow stops at once: the rise is a V/g of what arrived,
 * here Q/Y. Of 0.15 m for both ways the pocket goes almost as if it were not there. */
static void the_last_air_leaves_with_a_slam(void **state)
{
    (void)state;
    kent_air_valve wide = valve_of(0.15, 0.15), narrow = valve_of(0.15, 0.02);
    const slam fast = slams(&wide, 0.01), slow = slams(&narrow, 0.01);
    assert_close(fast.after - fast.before, fast.arrives / Y, 1e-9);
    assert_close(slow.after - slow.before, slow.arrives / Y, 1e-9);
    assert_close(fast.arrives, 0.398686, 1e-4);  /* integrated apart, like the next */
    assert_close(slow.arrives, 0.0433070, 1e-4); /* held back by its air */
}

/* The same two differential equations (mass and volume of the air) integrated apart by
 * an implicit Runge-Kutta method: of what 2 s of vacuum let in 0.272483 m3 are left at
 * 3 s, through 0.03 m they have left at 5.14463 s, when 0.0974408 m3/s arrive. The
 * march comes nearer by half with half the step. */
static void it_goes_to_the_solution_as_the_step_does(void **state)
{
    (void)state;
    kent_air_valve valve = valve_of(0.15, 0.03);
    double off = 1.0; /* m3 */
    for (int i = 0; i < 5; i++) {
        const double step = 0.04 / (1 << i);
        lone l;
        valve_new(&l, &valve, step);
        for (int k = 0; k < 75 << i; k++) {
            lone_beside(&l, k < 50 << i ? -5.0 : 30.0, Y);
        }
        const double now = fabs(lone_told(&l, 0) - 0.272482518);
        lone_clear(&l);
        assert_true(now < 0.7 * off);
        off = now;
        const slam s = slams(&valve, step);
        assert_within(s.at, 5.14463, 1.5 * step);
        assert_close(s.arrives, 0.0974408, 1e-5);
    }
    assert_true(off < 1e-4);
}

/* Air let in again finds a valve that had switched at its full release orifice. */
static void one_that_switched_is_ready_again_after_air_came_in(void **state)
{
    (void)state;
    lone l;
    kent_air_valve valve = valve_of(0.1, 0.05);
    valve.switch_pressure = 5000.0;
    valve.switched_orifice = 0.01;
    valve_new(&l, &valve, 0.01);
    const double full = 0.25 * PI * 0.05 * 0.05;
    const kent_orifice released = {0.0, 0.7 * full, ATMOSPHERE, WATER};
    const kent_orifice switched = {0.0, 0.7 * full / 25.0, ATMOSPHERE, WATER};
    for (int i = 0; i < 1000; i++) { /* in, out fast, in again, out slowly */
        const double mass = mass_of(&l);
        const bool fast = i >= 500 && i < 600, slow = i >= 900;
        lone_beside(&l, fast ? 30.0 : slow ? Z + 0.3 : -5.0, Y);
        const double p = absolute(&l);
        const kent_orifice *hole = fast ? &switched : &released;
        if (!(fast && i >= 590) && !(slow && i >= 950)) continue;
        assert_true(p > ATMOSPHERE + (fast ? 5000.0 : 10.0));
        assert_within(mass_of(&l) - mass, 0.01 * kent_air_through(hole, p).mass, 1e-9);
    }
    assert_true(mass_of(&l) > 0.0);
    lone_clear(&l);
}

/* Non-slam: from 0.05 bar inside it lets air out through 0.02 m in place of 0.15. */
static void one_that_switches_slams_less(void **state)
{
    (void)state;
    kent_air_valve plain = valve_of(0.15, 0.15), gentle = plain;
    gentle.switch_pressure = 500.0;
    gentle.switched_orifice = 0.02;
    const slam hard = slams(&plain, 0.01), soft = slams(&gentle, 0.01);
    assert_true(soft.arrives < 0.3 * hard.arrives && soft.at > hard.at);
    /* and is no less gentle the second time */
    lone l;
    valve_new(&l, &gentle, 0.01);
    double second = 0.0;
    for (int i = 0; i < 40000; i++) {
        const double before = l.flow;
        const bool air = lone_told(&l, 0) > 0.0;
        lone_beside(&l, i % 20000 < 200 ? -5.0 : 30.0, Y);
        if (air && lone_told(&l, 0) == 0.0) second = before;
    }
    assert_close(second, soft.arrives, 1e-6);
    lone_clear(&l);
}

static void two_side_by_side_are_one_of_twice_the_area(void **state)
{
    (void)state;
    kent_air_valve two = valve_of(0.1, 0.02),
                   one = valve_of(0.1 * sqrt(2.0), 0.02 * sqrt(2.0));
    two.in_parallel = 2;
    const slam a = slams(&two, 0.01), b = slams(&one, 0.01);
    assert_close(a.arrives, b.arrives, 1e-6);
    assert_close(a.at, b.at, 1e-9);
}

/* The main is 100 m of 0.5 m, 19.6 m3: more than a tenth of it would not stay. */
static void too_much_air_to_stay_is_said(void **state)
{
    (void)state;
    lone l;
    kent_air_valve valve = valve_of(0.15, 0.15);
    valve_new(&l, &valve, 0.01);
    bool said = false;
    while (!said && l.time < 20.0) {
        lone_beside(&l, -5.0, Y);
        said = l.ops->caution(&l.state) != NULL;
        assert_true(said == (lone_told(&l, 0) > 0.1 * 100.0 * 0.25 * PI * 0.25));
    }
    assert_true(said);
    lone_beside(&l, 60.0, Y);
    assert_non_null(strstr(l.ops->caution(&l.state), "spread")); /* it has been */
    lone_clear(&l);
}

static void one_above_the_steady_head_is_refused(void **state)
{
    (void)state;
    lone l;
    kent_air_valve valve = valve_of(0.15, 0.01);
    lone_new(&l, &KENT_AT_AIR_VALVE, Z);
    l.model.air_valves = &valve;
    lone_refused(&l, 9.9, "it would let in air all the time");
    lone_clear(&l);
}

static void its_law_has_one_answer_and_true_slopes(void **state)
{
    (void)state;
    lone l;
    kent_air_valve valve = valve_of(0.15, 0.03);
    valve_new(&l, &valve, 0.05);
    for (int i = 0; i < 40; i++) {
        l.ops->move(&l.state, l.schedule, 0.05, 0.05);
        lone_check_law(&l, 1.0, 25.0, false);
        lone_beside(&l, i < 20 ? -5.0 : 30.0, Y);
    }
    lone_clear(&l);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(air_and_water_are_both_counted),
        cmocka_unit_test(it_is_shut_while_there_is_pressure_and_no_air),
        cmocka_unit_test(a_wide_one_breaks_the_vacuum),
        cmocka_unit_test(a_narrow_one_is_choked),
        cmocka_unit_test(what_cannot_leave_is_pressed_by_boyles_law),
        cmocka_unit_test(the_last_air_leaves_with_a_slam),
        cmocka_unit_test(it_goes_to_the_solution_as_the_step_does),
        cmocka_unit_test(one_that_switched_is_ready_again_after_air_came_in),
        cmocka_unit_test(one_that_switches_slams_less),
        cmocka_unit_test(two_side_by_side_are_one_of_twice_the_area),
        cmocka_unit_test(too_much_air_to_stay_is_said),
        cmocka_unit_test(one_above_the_steady_head_is_refused),
        cmocka_unit_test(its_law_has_one_answer_and_true_slopes),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
