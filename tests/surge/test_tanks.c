/* Open and one-way surge tanks, each alone. */
#include "lone.h"

#include <math.h>
#include <string.h>

static const double G = 9.81, PI = 3.14159265358979323846;

static kent_surge_tank open_tank(double area)
{
    return (kent_surge_tank){.id = "ST",
                             .point = 0,
                             .area = area,
                             .bottom_level = -1e3,
                             .overflow_level = (double)INFINITY,
                             .connection_diameter = 1.0,
                             .node = 0,
                             .place = {0, 7}};
}

static kent_one_way_tank feed_tank(double area, double level)
{
    return (kent_one_way_tank){.id = "FT",
                               .point = 0,
                               .area = area,
                               .level = level,
                               .bottom_level = -1e3,
                               .connection_diameter = 0.3,
                               .loss_out = 4.0,
                               .place = {0, 7}};
}

typedef struct swing {
    double peak, at; /* m above the start, s */
    double period;   /* s, between the first two crossings of the start, doubled */
} swing;

/* A rigid frictionless line stopped at its tank. */
static swing tank_swings(double flow, double length, double bore_area, double area)
{
    lone l;
    swing s = {0};
    double crossed = 0.0, last = 0.0;
    kent_surge_tank tank = open_tank(area);
    lone_new(&l, &KENT_AT_SURGE_TANK, 0.0);
    l.model.surge_tanks = &tank;
    lone_start(&l, flow, 50.0, 0.0, 0.02);
    while (s.period == 0.0) {
        lone_column(&l, length / (G * bore_area), 50.0);
        const double rise = lone_told(&l, 0) - 50.0;
        if (rise > s.peak) {
            s.peak = rise;
            s.at = l.time;
        }
        if (last > 0.0 && rise <= 0.0) crossed = l.time;
        if (last < 0.0 && rise >= 0.0) s.period = 2.0 * (l.time - crossed);
        last = rise;
    }
    lone_clear(&l);
    return s;
}

/* J. F. Douglas et al., Fluid Mechanics, ex. 20.5, p. 705: 2 m3/s, 200 m, tunnel of
 * 1.227 m2, tank of 12.57 m2: 2.299 m, 90.8 s */
static void a_tank_swings_as_in_the_textbook(void **state)
{
    (void)state;
    const swing s = tank_swings(2.0, 200.0, 1.227, 12.57);
    assert_close(s.peak, 2.299, 1e-3);
    assert_close(s.period, 90.8, 1e-3);
}

/* V sqrt(L Ap/(g As)) and 2 pi sqrt(L As/(g Ap)): 1000 m of 1.0 m, 1.5 m/s, 20 m2;
 * worked out apart: 3.0011 m, 320.12 s */
static void a_larger_tank_swings_by_the_closed_form(void **state)
{
    (void)state;
    const swing s = tank_swings(1.5 * 0.25 * PI, 1000.0, 0.25 * PI, 20.0);
    assert_close(s.peak, 3.0011, 5e-4);
    assert_close(s.period, 320.12, 5e-4);
    assert_close(s.at, 320.12 / 4.0, 1e-3);
}

/* Kinetic energy of the line and energy of the water lifted: their sum stays. */
static void nothing_is_lost_in_a_hundred_swings(void **state)
{
    (void)state;
    const double inertia = 200.0 / (G * 1.227), area = 12.57;
    lone l;
    kent_surge_tank tank = open_tank(area);
    lone_new(&l, &KENT_AT_SURGE_TANK, 0.0);
    l.model.surge_tanks = &tank;
    lone_start(&l, 2.0, 50.0, 0.0, 0.5);
    for (int i = 0; i < 18000; i++) {
        lone_column(&l, inertia, 50.0);
        const double rise = lone_told(&l, 0) - 50.0;
        assert_close(inertia * l.flow * l.flow + area * rise * rise, inertia * 4.0,
                     1e-9);
    }
    assert_close(area * (lone_told(&l, 0) - 50.0), l.through, 1e-9);
    lone_clear(&l);
}

/* Kinetic energy lost = energy of the lift + rho g times the losses Q K V2/2g. */
static void losses_take_what_the_swing_loses(void **state)
{
    (void)state;
    const double inertia = 200.0 / (G * 1.227), area = 12.57, step = 0.01;
    const double hole = 0.25 * PI; /* m2, connection of 1 m */
    lone l;
    kent_surge_tank tank = open_tank(area);
    tank.loss_in = 3.0;
    tank.loss_out = 7.0;
    double lost = 0.0, last = 0.0; /* m4: loss times volume */
    lone_new(&l, &KENT_AT_SURGE_TANK, 0.0);
    l.model.surge_tanks = &tank;
    /* the steady head holds the loss as well */
    const double first = 50.0 + 3.0 * pow(2.0 / hole, 2.0) / (2.0 * G);
    lone_start(&l, 2.0, first, 0.0, step);
    assert_close(lone_told(&l, 0), 50.0, 1e-12);
    last = (first - 50.0) * 2.0;
    for (int i = 0; i < 15000; i++) {
        lone_column(&l, inertia, 50.0);
        const double k = l.flow > 0.0 ? 3.0 : 7.0;
        const double power =
            k * pow(fabs(l.flow) / hole, 2.0) / (2.0 * G) * fabs(l.flow);
        lost += 0.5 * step * (last + power);
        last = power;
        const double rise = lone_told(&l, 0) - 50.0;
        assert_within(0.5 * inertia * (4.0 - l.flow * l.flow),
                      0.5 * area * rise * rise + lost, 1e-5 * inertia);
    }
    assert_true(lost > 0.5 * inertia); /* a quarter of all there was */
    lone_clear(&l);
}

static void an_overflow_caps_the_level_and_counts_what_it_spills(void **state)
{
    (void)state;
    lone l;
    kent_surge_tank tank = open_tank(12.57);
    tank.overflow_level = 51.0;
    lone_new(&l, &KENT_AT_SURGE_TANK, 0.0);
    l.model.surge_tanks = &tank;
    lone_start(&l, 2.0, 50.0, 0.0, 0.05);
    assert_null(l.ops->caution(&l.state));
    double highest = 0.0;
    for (int i = 0; i < 4000; i++) {
        lone_column(&l, 200.0 / (G * 1.227), 50.0);
        highest = fmax(highest, l.head[0]);
        assert_close(12.57 * (lone_told(&l, 0) - 50.0) + lone_told(&l, 1), l.through,
                     1e-9);
    }
    assert_close(highest, 51.0, 1e-9);
    assert_true(lone_told(&l, 1) > 1.0);
    assert_non_null(strstr(l.ops->caution(&l.state), "overflows"));
    lone_clear(&l);
}

static void a_tank_that_runs_dry_stops_the_march(void **state)
{
    (void)state;
    lone l;
    kent_surge_tank tank = open_tank(2.0);
    tank.bottom_level = 49.0;
    lone_new(&l, &KENT_AT_SURGE_TANK, 0.0);
    l.model.surge_tanks = &tank;
    lone_start(&l, 0.0, 50.0, 0.0, 0.1);
    const double head[2] = {49.0, 0.0};
    for (int i = 1; i <= 21; i++) {
        l.ops->move(&l.state, l.schedule, 0.1 * i, 0.1);
        l.ops->settle(&l.state, -1.0, head); /* 0.05 m a step, 0.025 in the first */
        assert_true((l.ops->beyond(&l.state) != NULL) == (i == 21));
    }
    assert_non_null(strstr(l.ops->beyond(&l.state), "is empty"));
    lone_clear(&l);
}

static void a_tank_that_does_not_suit_its_steady_state_is_refused(void **state)
{
    (void)state;
    lone l;
    kent_surge_tank tank = open_tank(2.0);
    kent_one_way_tank feed = feed_tank(12.0, 40.0);
    tank.bottom_level = 30.0;
    tank.overflow_level = 60.0;
    lone_new(&l, &KENT_AT_SURGE_TANK, 0.0);
    l.model.surge_tanks = &tank;
    l.model.one_way_tanks = &feed;
    lone_refused(&l, 60.1, "above its overflow_level of 60.00 m");
    lone_refused(&l, 29.9, "below its bottom_level of 30.00 m");
    l.ops = &KENT_AT_ONE_WAY_TANK;
    lone_refused(&l, 39.9, "below its level of 40.00 m");
    lone_clear(&l);
}

/* One-way: level falls by what it fed, through the loss of its connection; the pipe
 * gives y (c - H). */
static void a_one_way_tank_feeds_below_its_level_only(void **state)
{
    (void)state;
    const double k = 4.0 / (2.0 * G * pow(0.25 * PI * 0.09, 2.0)); /* s2/m5 */
    lone l;
    kent_one_way_tank tank = feed_tank(12.0, 98.0);
    double fed = 0.0, before = 0.0;
    lone_new(&l, &KENT_AT_ONE_WAY_TANK, 0.0);
    l.model.one_way_tanks = &tank;
    lone_start(&l, 0.0, 110.0, 0.0, 0.05);
    for (int i = 0; i < 4000; i++) {
        const double c = 98.0 + 12.0 * cos(0.1 * l.time); /* m */
        before = l.flow;
        lone_beside(&l, c, 0.02);
        fed -= 0.025 * (before + l.flow);
        const double level = lone_told(&l, 0);
        assert_true(l.flow <= 0.0);
        assert_close(level, 98.0 - fed / 12.0, 1e-12);
        if (l.flow < 0.0) {
            assert_within(l.head[0], level - k * l.flow * l.flow, 1e-9);
        } else {
            assert_true(l.flow == 0.0 && l.head[0] >= level - 0.051);
        }
    }
    assert_true(fed > 1.0);
    lone_clear(&l);
}

static void an_empty_one_way_tank_stops_the_march(void **state)
{
    (void)state;
    lone l;
    kent_one_way_tank tank = feed_tank(0.5, 98.0);
    const double head[2] = {96.5, 0.0};
    tank.bottom_level = 97.0;
    lone_new(&l, &KENT_AT_ONE_WAY_TANK, 0.0);
    l.model.one_way_tanks = &tank;
    lone_start(&l, 0.0, 110.0, 0.0, 0.1);
    for (int i = 1; i <= 11; i++) {
        l.ops->move(&l.state, l.schedule, 0.1 * i, 0.1);
        l.ops->settle(&l.state, -0.5, head); /* 0.1 m a step, half that in the first */
        assert_true((l.ops->beyond(&l.state) != NULL) == (i == 11));
    }
    assert_non_null(strstr(l.ops->beyond(&l.state), "is empty"));
    lone_clear(&l);
}

static void their_laws_have_one_answer_and_true_slopes(void **state)
{
    (void)state;
    lone l;
    kent_surge_tank tank = open_tank(2.0);
    kent_one_way_tank feed = feed_tank(2.0, 50.0);
    tank.loss_in = 2.0;
    tank.loss_out = 3.0;
    tank.overflow_level = 50.05;
    lone_new(&l, &KENT_AT_SURGE_TANK, 0.0);
    l.model.surge_tanks = &tank;
    l.model.one_way_tanks = &feed;
    lone_start(&l, 0.0, 50.0, 0.0, 0.1);
    l.ops->move(&l.state, l.schedule, 0.1, 0.1);
    lone_check_law(&l, 3.0, 2.0, false);
    kent_schedule_free(l.schedule);
    l.ops = &KENT_AT_ONE_WAY_TANK;
    lone_start(&l, 0.0, 50.0, 0.0, 0.1);
    l.ops->move(&l.state, l.schedule, 0.1, 0.1);
    lone_check_law(&l, 3.0, 2.0, false);
    lone_clear(&l);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_tank_swings_as_in_the_textbook),
        cmocka_unit_test(a_larger_tank_swings_by_the_closed_form),
        cmocka_unit_test(nothing_is_lost_in_a_hundred_swings),
        cmocka_unit_test(losses_take_what_the_swing_loses),
        cmocka_unit_test(an_overflow_caps_the_level_and_counts_what_it_spills),
        cmocka_unit_test(a_tank_that_runs_dry_stops_the_march),
        cmocka_unit_test(a_tank_that_does_not_suit_its_steady_state_is_refused),
        cmocka_unit_test(a_one_way_tank_feeds_below_its_level_only),
        cmocka_unit_test(an_empty_one_way_tank_stops_the_march),
        cmocka_unit_test(their_laws_have_one_answer_and_true_slopes),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
