/* An air vessel, alone. */
#include "lone.h"

#include <math.h>
#include <string.h>

static const double G = 9.81, PI = 3.14159265358979323846;

static kent_air_vessel vessel_of(double gas, double exponent)
{
    return (kent_air_vessel){.id = "VES1",
                             .point = 0,
                             .total_volume = 10.0,
                             .gas_volume = gas,
                             .polytropic_exponent = exponent,
                             .water_level = (double)NAN,
                             .area = (double)INFINITY,
                             .connection_diameter = 0.3,
                             .place = {0, 7}};
}

/* m: what a gauge head at level 0 is in absolute terms. */
static double absolute(double head) { return head + 101325.0 / (1000.0 * G); }

typedef struct swing {
    double highest, lowest; /* m absolute */
    double period;          /* s */
} swing;

/* A rigid frictionless column of 500 m of 0.5 m, stopped at a vessel of 1 m3 of gas in
 * balance with a reservoir of 60 m absolute. */
static swing vessel_swings(double velocity, double exponent)
{
    const double area = 0.25 * PI * 0.25, level = 60.0 - 101325.0 / (1000.0 * G);
    lone l;
    swing s = {0.0, 1e9, 0.0};
    double last = 0.0;
    kent_air_vessel vessel = vessel_of(1.0, exponent);
    lone_new(&l, &KENT_AT_AIR_VESSEL, 0.0);
    l.model.air_vessels = &vessel;
    lone_start(&l, velocity * area, level, 0.0, 0.001);
    while (s.period == 0.0) {
        lone_column(&l, 500.0 / (G * area), level);
        const double head = absolute(l.head[0]), rise = head - 60.0;
        s.highest = fmax(s.highest, head);
        s.lowest = fmin(s.lowest, head);
        if (last < 0.0 && rise >= 0.0) s.period = l.time;
        last = rise;
    }
    lone_clear(&l);
    return s;
}

/* Worked out apart from 0.5 rho A L V0^2 = the work on the gas, from p V^n and from
 * 2 pi sqrt(L V/(g A n H)): rigid column, closed forms. */
static void it_takes_the_column_up_as_energy_says(void **state)
{
    (void)state;
    static const struct {
        double exponent, highest, lowest, period;
    } want[] = {{1.0, 92.995, 40.93, 13.07}, {1.4, 98.866, 37.64, 11.05}};
    for (int i = 0; i < 2; i++) {
        const swing s = vessel_swings(1.0, want[i].exponent);
        assert_close(s.highest, want[i].highest, 2e-5);
        assert_close(s.lowest, want[i].lowest, 2e-4);
        assert_close(vessel_swings(1e-3, want[i].exponent).period, want[i].period,
                     1e-3);
    }
}

/* With a level that moves and losses: kinetic energy lost = work on the gas above the
 * reservoir's pressure + lift + losses, all in m4 (over rho g); V from the told
 * volume. */
static void gas_lift_and_losses_take_what_the_column_loses(void **state)
{
    (void)state;
    const double bore = 0.25 * PI * 0.25, hole = 0.25 * PI * 0.09, plan = 4.0;
    const double inertia = 500.0 / (G * bore), level = 50.0, step = 0.001;
    const double weight = 1000.0 * G;
    lone l;
    kent_air_vessel vessel = vessel_of(1.0, 1.2);
    vessel.area = plan;
    vessel.loss_in = 12.0;
    vessel.loss_out = 5.0;
    lone_new(&l, &KENT_AT_AIR_VESSEL, 0.0);
    l.model.air_vessels = &vessel;
    const double q0 = bore * 1.0;
    const double k_in = 12.0 / (2.0 * G * hole * hole), k_out = 5.0 / 12.0 * k_in;
    lone_start(&l, q0, level + k_in * q0 * q0, 0.0, step);
    const double p0 = 101325.0 + weight * level;
    assert_close(lone_told(&l, 1), p0 - 101325.0, 1e-12);
    double lost = 0.0, last = k_in * q0 * q0 * q0;
    for (int i = 0; i < 30000; i++) {
        lone_column(&l, inertia, level);
        const double power = (l.flow > 0.0 ? k_in : k_out) * pow(fabs(l.flow), 3.0);
        lost += 0.5 * step * (last + power);
        last = power;
        const double volume = lone_told(&l, 0), p = lone_told(&l, 1) + 101325.0;
        const double in = 1.0 - volume; /* m3 of water */
        assert_close(p, p0 * pow(volume, -1.2), 1e-11);
        assert_close(lone_told(&l, 2), in / plan, 1e-9);
        assert_within(in, l.through, 1e-10);
        const double work = (p * volume - p0) / (0.2 * weight) - p0 * in / weight;
        const double lift = 0.5 * in * in / plan;
        assert_within(0.5 * inertia * (q0 * q0 - l.flow * l.flow), work + lift + lost,
                      1e-4 * inertia * q0 * q0);
    }
    assert_true(lost > 0.1 * inertia * q0 * q0);
    lone_clear(&l);
}

static void a_vessel_that_cannot_be_is_refused(void **state)
{
    (void)state;
    lone l;
    kent_air_vessel vessel = vessel_of(1.0, 1.2);
    lone_new(&l, &KENT_AT_AIR_VESSEL, 0.0);
    l.model.air_vessels = &vessel;
    vessel.total_volume = 1.0;
    lone_refused(&l, 50.0, "gas_volume is not less than total_volume");
    vessel.total_volume = 10.0;
    vessel.water_level = 62.0;
    lone_refused(&l, 50.0, "no gas can be over it");
    lone_clear(&l);
}

static void it_stops_the_march_when_empty_or_full(void **state)
{
    (void)state;
    const double head[2] = {50.0, 0.0}, flow[] = {-1.0, 1.0};
    const char *const says[] = {"is empty of water", "is full of water"};
    const int last[] = {91, 11}; /* steps of 0.1 m3, half that in the first */
    for (int k = 0; k < 2; k++) {
        lone l;
        kent_air_vessel vessel = vessel_of(1.0, 1.2);
        lone_new(&l, &KENT_AT_AIR_VESSEL, 0.0);
        l.model.air_vessels = &vessel;
        lone_start(&l, 0.0, 50.0, 0.0, 0.1);
        for (int i = 1; i <= last[k]; i++) {
            l.ops->move(&l.state, l.schedule, 0.1 * i, 0.1);
            l.ops->settle(&l.state, flow[k], head);
            assert_true((l.ops->beyond(&l.state) != NULL) == (i == last[k]));
        }
        assert_non_null(strstr(l.ops->beyond(&l.state), says[k]));
        lone_clear(&l);
    }
}

static void its_law_has_one_answer_and_true_slopes(void **state)
{
    (void)state;
    lone l;
    kent_air_vessel vessel = vessel_of(0.2, 1.2);
    vessel.area = 3.0;
    vessel.loss_in = 12.0;
    vessel.loss_out = 5.0;
    lone_new(&l, &KENT_AT_AIR_VESSEL, 0.0);
    l.model.air_vessels = &vessel;
    lone_start(&l, 0.0, 50.0, 0.0, 0.1);
    l.ops->move(&l.state, l.schedule, 0.1, 0.1);
    lone_check_law(&l, 3.0, 20.0, false); /* 0.2 m3: pressed to nothing on the way */
    lone_clear(&l);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(it_takes_the_column_up_as_energy_says),
        cmocka_unit_test(gas_lift_and_losses_take_what_the_column_loses),
        cmocka_unit_test(a_vessel_that_cannot_be_is_refused),
        cmocka_unit_test(it_stops_the_march_when_empty_or_full),
        cmocka_unit_test(its_law_has_one_answer_and_true_slopes),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
