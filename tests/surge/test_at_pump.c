#include "pump_rig.h"

#include "kent_check.h"

#include <math.h>
#include <string.h>

static const double GRAVITY = 9.81, DENSITY = 1000.0;
static const double AREA = 0.14, WAVE = 1000.0, RATED = 0.2; /* m2, m/s, m3/s */

static void march(rig *r, double time)
{
    const size_t until = (size_t)lround(time / r->step);
    while (r->steps < until) {
        rig_advance(r);
    }
}

static double speed_share(const rig *r)
{
    return rig_told(r, 0) / r->pump.curve.rated_speed;
}

/* ---- one unit -------------------------------------------------------------------- */

static void without_an_event_nothing_changes(void **state)
{
    (void)state;
    const kent_check_kind kinds[] = {KENT_CHECK_NONE, KENT_CHECK_IDEAL,
                                     KENT_CHECK_DELAYED};
    for (size_t i = 0; i < 3; i++) {
        static rig r;
        rig_pump(&r, 60.0, 3, 2);
        r.pump.check_valve = kinds[i];
        r.pump.check_delay = 0.3;
        r.pump.check_loss = 20.0;
        if (i == 0) r.pump.in_parallel = 2;
        rig_start(&r, AREA, WAVE, 0.17, 0.01, 200);
        march(&r, 10.0);
        assert_close(r.flow, 0.34, 1e-13);
        assert_close(r.head[1], r.far_level, 1e-13);
        assert_close(speed_share(&r), 1.0, 1e-15);
        rig_clear(&r);
    }
}

/* A main of 1000 m after a trip, no check valve, through all of flow reversed, speed
 * reversed and turning as a turbine. Values: the same equations integrated apart by
 * Runge and Kutta's method of fourth order with steps of 2.5 ms, cubics by the library
 * scipy; its own steps of 5 ms agree to the digits asserted. */
static void a_trip_is_that_of_an_independent_integration(void **state)
{
    (void)state;
    static const struct {
        double specific_speed, inertia, time, flow, speed, head;
    } rows[] = {
        {40, 12, 1, 0.1682955, 0.7564493, 26.91532},
        {40, 12, 2, 0.1521273, 0.6010088, 15.14291},
        {40, 12, 4, 0.0513926, 0.4451035, 11.51020},
        {40, 12, 6, -0.0524194, 0.3778291, 12.90219},
        {40, 12, 10, -0.1947855, -0.2951249, 32.88222},
        {40, 12, 20, -0.1462293, -1.2481152, 51.99119},
        {180, 2, 1, 0.1879819, 0.9144169, 41.24936},
        {180, 2, 4, 0.1269643, 0.7297843, 28.17741},
        {180, 2, 10, -0.0631134, 0.4519549, 38.85114},
        {180, 2, 20, -0.1757704, -0.2513385, 41.03047},
    };
    static rig r;
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        if (i == 0 || rows[i].specific_speed != rows[i - 1].specific_speed) {
            if (i > 0) rig_clear(&r);
            rig_pump(&r, rows[i].specific_speed, 1, 1);
            r.pump.inertia = rows[i].inertia;
            rig_event(&r, KENT_TRIP, 0.0, NAN, 0, NAN);
            rig_start(&r, AREA, WAVE, RATED, 0.005, 400);
        }
        march(&r, rows[i].time);
        assert_within(r.flow, rows[i].flow, 2e-5 * RATED);
        assert_within(speed_share(&r), rows[i].speed, 2e-5);
        assert_within(r.head[1], rows[i].head, 2e-5 * 50.0);
    }
    assert_string_equal(r.ops->caution(&r.state), "turned backwards");
    rig_clear(&r);
}

/* Against a shut check valve torque goes with the square of the speed, and dw/dt =
 * -T/I has the answer w = w0/(1 + T0 t/(I w0)) (calculus): T0 that at shut-off. */
static double speed_error_at_shut_off(double step)
{
    static rig r;
    rig_pump(&r, 40.0, 1, 1);
    r.pump.check_valve = KENT_CHECK_IDEAL;
    rig_event(&r, KENT_TRIP, 0.0, NAN, 0, NAN);
    rig_start(&r, AREA, WAVE, 0.0, step, 0);
    const double w0 = r.pump.curve.rated_speed, torque = rig_told(&r, 1);
    march(&r, 4.0);
    assert_true(r.flow == 0.0);
    const double want = w0 / (1.0 + torque * 4.0 / (r.pump.inertia * w0));
    const double error = (rig_told(&r, 0) - want) / w0;
    rig_clear(&r);
    return error;
}

static void the_run_down_behind_a_shut_valve_is_exact_to_second_order(void **state)
{
    (void)state;
    const double coarse = speed_error_at_shut_off(0.08);
    const double fine = speed_error_at_shut_off(0.04);
    assert_true(fabs(coarse) < 1e-4);
    assert_close(coarse / fine, 4.0, 0.02);
}

/* Energy: what the rotor loses is what its torque does, whose part in the water is rho
 * g Q H; the rest is lost in the pump. */
static double energy_gap(double step, double *efficiency)
{
    static rig r;
    rig_pump(&r, 40.0, 1, 1);
    rig_event(&r, KENT_TRIP, 0.0, NAN, 0, NAN);
    rig_start(&r, AREA, WAVE, RATED, step, (size_t)lround(2.0 / step));
    const double w0 = rig_told(&r, 0);
    double work = 0.0, water = 0.0;
    while (r.time < 4.0 - 0.5 * step) {
        const double power = rig_told(&r, 1) * rig_told(&r, 0);
        const double lift = r.flow * r.head[1];
        rig_advance(&r);
        work += 0.5 * step * (power + rig_told(&r, 1) * rig_told(&r, 0));
        water += 0.5 * step * DENSITY * GRAVITY * (lift + r.flow * r.head[1]);
    }
    const double w = rig_told(&r, 0);
    const double fall = 0.5 * r.pump.inertia * (w0 * w0 - w * w);
    *efficiency = water / work;
    rig_clear(&r);
    return fabs(work / fall - 1.0);
}

static void the_rotor_loses_the_energy_it_gives(void **state)
{
    (void)state;
    double efficiency = 0.0;
    const double coarse = energy_gap(0.04, &efficiency);
    const double fine = energy_gap(0.02, &efficiency);
    assert_true(coarse < 2e-3 && fine < 0.3 * coarse);
    assert_true(efficiency > 0.5 && efficiency < 0.84); /* 0.84 at its best point */
}

/* An event between two instants acts from its own time on. */
static void a_trip_between_steps_counts_from_its_own_time(void **state)
{
    (void)state;
    static rig r, at_once;
    rig_pump(&r, 40.0, 1, 1);
    rig_event(&r, KENT_TRIP, 0.013, NAN, 0, NAN);
    rig_start(&r, AREA, WAVE, RATED, 0.02, 100);
    rig_pump(&at_once, 40.0, 1, 1);
    rig_event(&at_once, KENT_TRIP, 0.013, NAN, 0, NAN);
    rig_start(&at_once, AREA, WAVE, RATED, 0.001, 2000);
    march(&r, 1.0);
    march(&at_once, 1.0);
    assert_within(speed_share(&r), speed_share(&at_once), 3e-5);
    assert_within(r.flow, at_once.flow, 3e-5 * RATED);
    rig_clear(&r);
    rig_clear(&at_once);
}

/* A rotor that stops within a share of a step: its speed falls without ringing, and the
 * torque on it is soon gone. */
static void a_rotor_without_inertia_does_not_ring(void **state)
{
    (void)state;
    static rig r;
    rig_pump(&r, 40.0, 1, 1);
    r.pump.inertia = 0.01; /* 3 ms */
    r.pump.check_valve = KENT_CHECK_IDEAL;
    rig_event(&r, KENT_TRIP, 0.0, NAN, 0, NAN);
    rig_start(&r, AREA, WAVE, RATED, 0.05, 0);
    double before = 1.0;
    for (int i = 0; i < 200; i++) {
        rig_advance(&r);
        assert_true(speed_share(&r) > 0.0 && speed_share(&r) <= before);
        before = speed_share(&r);
        assert_true(rig_told(&r, 1) < 0.02 * r.pump.curve.rated_torque);
    }
    rig_clear(&r);
}

/* Under a lasting head it runs away backwards until no torque is left. At N_s = 147 the
 * published torque is nil at x = pi/4, where W_H = 0.190: alpha = v = -sqrt(h/0.38). */
static void without_a_check_valve_it_runs_away_as_the_tables_say(void **state)
{
    (void)state;
    static rig r;
    rig_pump(&r, 147.0, 1, 1);
    r.pump.inertia = 1.0;
    rig_event(&r, KENT_TRIP, 0.0, NAN, 0, NAN);
    rig_start(&r, 1e6, WAVE, RATED, 0.01, 0); /* so wide that its head stands */
    march(&r, 60.0);
    const double share = -sqrt(r.far_level / 50.0 / 0.38);
    assert_close(speed_share(&r), share, 1e-6);
    assert_close(r.flow, share * RATED, 1e-6);
    rig_clear(&r);
}

/* Stopped, it is a resistance: W_H = 0.692 at x = pi/2 for N_s = 25. */
static void a_stopped_pump_is_a_resistance(void **state)
{
    (void)state;
    static rig r;
    rig_pump(&r, 25.0, 1, 1);
    rig_event(&r, KENT_STOP, 1.0, 5.0, 0, NAN);
    rig_start(&r, 1e6, WAVE, RATED, 0.01, 0);
    march(&r, 1.0 + 2.5);
    assert_close(speed_share(&r), 0.5, 1e-12);
    march(&r, 10.0);
    assert_true(rig_told(&r, 0) == 0.0);
    assert_close(r.flow, -RATED * sqrt(r.far_level / 50.0 / 0.692), 1e-6);
    rig_clear(&r);
}

/* Overspeed: laws of affinity at 1.1 times the speed, Q and H on 1.21 F(Q/1.1). */
static void a_ramp_goes_to_its_share_of_the_speed(void **state)
{
    (void)state;
    static rig r;
    rig_pump(&r, 60.0, 1, 1);
    rig_event(&r, KENT_RAMP, 0.5, 2.0, 0, 1.1);
    rig_start(&r, AREA, WAVE, RATED, 0.01, 0);
    march(&r, 1.5);
    assert_close(speed_share(&r), 1.05, 1e-12);
    march(&r, 3.0);
    assert_close(speed_share(&r), 1.1, 1e-14);
    const kent_pump_curve *c = &r.pump.curve;
    assert_close(r.head[1], 1.21 * kent_pump_at(c, r.flow / 1.1, c->rated_speed).head,
                 1e-12);
    assert_true(r.flow > RATED);
    rig_clear(&r);
}

/* ---- check valves ---------------------------------------------------------------- */

static void an_ideal_check_valve_lets_nothing_back(void **state)
{
    (void)state;
    static rig r;
    rig_pump(&r, 40.0, 1, 1);
    r.pump.check_valve = KENT_CHECK_IDEAL;
    rig_event(&r, KENT_TRIP, 0.0, NAN, 0, NAN);
    rig_start(&r, AREA, WAVE, RATED, 0.01, 200);
    while (r.time < 30.0) {
        rig_advance(&r);
        assert_true(r.flow >= 0.0);
        assert_true(rig_told(&r, 0) > 0.0); /* it never turns back */
    }
    assert_true(r.flow == 0.0);
    assert_true(rig_told(&r, 2) == 0.0);
    assert_null(r.ops->caution(&r.state));
    rig_clear(&r);
}

/* Shuts so long after the flow reversed, at a step's end, and stops at once what flows
 * back then: the head rises by a/g of that velocity (N. Joukowsky, 1898). */
static void a_delayed_check_valve_slams(void **state)
{
    (void)state;
    const double delay = 0.7, step = 0.01;
    for (int own_size = 0; own_size < 2; own_size++) {
        static rig r;
        double reversed = NAN, shut = NAN, before = 0.0, head = 0.0;
        rig_pump(&r, 40.0, 2, 2);
        r.pump.check_valve = KENT_CHECK_DELAYED;
        r.pump.check_delay = delay;
        if (own_size) r.pump.check_size = 0.3;
        rig_event(&r, KENT_TRIP, 0.0, NAN, 0, NAN);
        rig_start(&r, 2.0 * AREA, WAVE, RATED, step, 200);
        while (r.time < 8.0) {
            const double flow = r.flow, h = r.head[1];
            rig_advance(&r);
            if (flow > 0.0 && r.flow < 0.0) {
                reversed = r.time - step * r.flow / (r.flow - flow);
            }
            if (r.flow == 0.0 && isnan(shut)) {
                shut = r.time;
                before = flow;
                head = r.head[1] - h;
            }
        }
        assert_true(shut >= reversed + delay && shut < reversed + delay + step);
        const double area = own_size ? 0.25 * acos(-1.0) * 0.09 : 2.0 * AREA;
        const double each = own_size ? 0.5 * before : before;
        assert_close(rig_told(&r, 2), -each / area, 1e-13);
        const double jump = WAVE / GRAVITY * -before / (2.0 * AREA);
        assert_within(head, jump, 0.1 * jump); /* the wave goes on arriving meanwhile */
        rig_clear(&r);
    }
}

/* ---- several ----------------------------------------------------------------------
 */

/* Three units are one of three times the flow, torque and inertia. */
static void units_side_by_side_are_one_larger_unit(void **state)
{
    (void)state;
    static rig three, one;
    rig_pump(&three, 40.0, 3, 3);
    three.pump.check_loss = 30.0;
    rig_event(&three, KENT_TRIP, 0.1, NAN, 0, NAN);
    rig_start(&three, 3.0 * AREA, WAVE, RATED, 0.01, 200);

    rig_pump(&one, 40.0, 1, 1);
    kent_pump_curve *c = &one.pump.curve;
    for (size_t i = 0; i < c->count; i++) {
        c->flow[i] *= 3.0;
    }
    c->rated_flow *= 3.0;
    c->suctions = 3; /* the same specific speed */
    assert_null(kent_pump_curve_complete(c, DENSITY, GRAVITY));
    one.pump.inertia *= 3.0;
    one.pump.check_loss = 30.0 / 9.0;
    rig_event(&one, KENT_TRIP, 0.1, NAN, 0, NAN);
    rig_start(&one, 3.0 * AREA, WAVE, 3.0 * RATED, 0.01, 200);
    for (int i = 0; i < 1000; i++) {
        rig_advance(&three);
        rig_advance(&one);
        assert_within(three.flow, one.flow, 1e-11 * RATED);
        assert_within(three.head[1], one.head[1], 1e-11 * 50.0);
        assert_within(speed_share(&three), speed_share(&one), 1e-11);
    }
    rig_clear(&three);
    rig_clear(&one);
}

/* The same trip asked for in two events: groups that are alike in all but name. */
static void groups_with_one_history_act_as_one(void **state)
{
    (void)state;
    static rig parts, whole;
    const kent_check_kind kinds[] = {KENT_CHECK_NONE, KENT_CHECK_IDEAL,
                                     KENT_CHECK_DELAYED};
    for (size_t k = 0; k < 3; k++) {
        rig_pump(&parts, 40.0, 3, 3);
        rig_pump(&whole, 40.0, 3, 3);
        parts.pump.check_valve = whole.pump.check_valve = kinds[k];
        parts.pump.check_delay = whole.pump.check_delay = 0.4;
        rig_event(&parts, KENT_TRIP, 0.5, NAN, 1, NAN);
        rig_event(&parts, KENT_TRIP, 0.5, NAN, 2, NAN);
        rig_event(&whole, KENT_TRIP, 0.5, NAN, 3, NAN);
        rig_start(&parts, 3.0 * AREA, WAVE, RATED, 0.01, 200);
        rig_start(&whole, 3.0 * AREA, WAVE, RATED, 0.01, 200);
        for (int i = 0; i < 1000; i++) {
            rig_advance(&parts);
            rig_advance(&whole);
            assert_within(parts.flow, whole.flow, 1e-9 * RATED);
            assert_within(parts.head[1], whole.head[1], 1e-9 * 50.0);
            assert_within(speed_share(&parts), speed_share(&whole), 1e-9);
        }
        rig_clear(&parts);
        rig_clear(&whole);
    }
}

/* One of three trips: its valve shuts, the main settles at what two deliver into it.
 * Into a main that never ends H = C + Q/Y, C from before. */
static void one_of_three_trips(void **state)
{
    (void)state;
    static rig r;
    rig_pump(&r, 40.0, 3, 3);
    r.pump.check_valve = KENT_CHECK_IDEAL;
    rig_event(&r, KENT_TRIP, 1.0, NAN, 1, NAN);
    rig_start(&r, 3.0 * AREA, WAVE, RATED, 0.01, 0);
    const double c = r.far_level - 0.6 / r.y;
    march(&r, 1.0);
    double before = 0.6;
    while (r.time < 10.0) {
        rig_advance(&r);
        assert_true(r.flow <= before + 1e-12); /* falls all the way */
        before = r.flow;
    }
    const kent_pump_curve *curve = &r.pump.curve;
    const double lifted = kent_pump_at(curve, 0.5 * r.flow, curve->rated_speed).head;
    assert_close(r.head[1], lifted, 1e-12);
    assert_close(r.head[1], c + r.flow / r.y, 1e-12);
    assert_true(r.flow > 0.4 && r.flow < 0.6); /* two deliver more than they did */
    assert_true(speed_share(&r) < 0.7 && speed_share(&r) > 0.0); /* the one's */
    rig_clear(&r);
}

static void standing_units_start_one_after_another(void **state)
{
    (void)state;
    static rig r;
    rig_pump(&r, 40.0, 12, 1);
    r.pump.check_valve = KENT_CHECK_IDEAL;
    for (int i = 0; i < 11; i++) {
        rig_event(&r, KENT_START, 1.0 + 3.0 * i, 2.0, 1, NAN);
    }
    rig_event(&r, KENT_START, 50.0, 2.0, 1, NAN); /* there is none left */
    rig_start(&r, 12.0 * AREA, WAVE, RATED, 0.01, 0);
    march(&r, 45.0);
    assert_null(r.ops->beyond(&r.state));
    assert_null(r.ops->caution(&r.state));
    const kent_pump_curve *c = &r.pump.curve;
    assert_close(r.head[1], kent_pump_at(c, r.flow / 12.0, c->rated_speed).head, 1e-12);
    march(&r, 51.0);
    assert_non_null(strstr(r.ops->caution(&r.state), "fewer units"));
    rig_clear(&r);
}

/* Behind a check valve they pass nothing even where water would push them open. */
static void standing_units_that_are_pushed_are_told(void **state)
{
    (void)state;
    for (int pushed = 0; pushed < 2; pushed++) {
        static rig r;
        rig_pump(&r, 50.0, 2, 0);
        r.pump.check_valve = KENT_CHECK_IDEAL;
        r.far_level = pushed ? -1.0 : 1.0; /* the suction level is 0 m */
        rig_start(&r, AREA, WAVE, 0.0, 0.01, 0);
        march(&r, 1.0);
        assert_true(r.flow == 0.0);
        const char *said = r.ops->caution(&r.state);
        assert_int_equal(said != NULL, pushed);
        if (said) assert_non_null(strstr(said, "water would run on through them"));
        rig_clear(&r);
    }
}

static void too_many_different_conditions_are_refused(void **state)
{
    (void)state;
    static rig r;
    rig_pump(&r, 40.0, 12, 12);
    for (int i = 0; i < 9; i++) {
        rig_event(&r, KENT_TRIP, 0.1 + 0.1 * i, NAN, 1, NAN);
    }
    r.pump.check_valve = KENT_CHECK_IDEAL;
    rig_start(&r, 12.0 * AREA, WAVE, RATED, 0.05, 0);
    march(&r, 0.7);
    assert_null(r.ops->beyond(&r.state));
    march(&r, 1.0);
    assert_non_null(strstr(r.ops->beyond(&r.state), "more different conditions"));
    rig_clear(&r);
}

/* Power comes back while the unit still turns and the wave returns: it ends where it
 * began, from either direction of turning. */
static void power_restored_onto_a_turning_pump(void **state)
{
    (void)state;
    const double at[] = {1.5, 5.0,
                         12.0}; /* s: pumping, reversed flow, reversed speed */
    for (int valve = 0; valve < 2; valve++) {
        for (size_t i = 0; i < 3; i++) {
            static rig r;
            double highest = 0.0;
            rig_pump(&r, 40.0, 1, 1);
            r.pump.check_valve = valve ? KENT_CHECK_IDEAL : KENT_CHECK_NONE;
            rig_event(&r, KENT_TRIP, 0.0, NAN, 0, NAN);
            rig_event(&r, KENT_START, at[i], 3.0, 0, NAN);
            rig_start(&r, AREA, WAVE, RATED, 0.05, 40);
            march(&r, at[i]);
            const double turning = speed_share(&r);
            if (!valve) assert_true(i < 2 ? turning > 0.0 : turning < -0.3);
            march(&r, at[i] + 1.5);
            assert_close(speed_share(&r), 0.5 * (1.0 + turning), 2e-2);
            while (r.time < 120.0) {
                rig_advance(&r);
                highest = fmax(highest, r.head[1]);
                assert_true(isfinite(r.flow));
            }
            assert_true(highest > 55.0); /* the restart into the wave is a surge */
            assert_close(r.flow, RATED, 1e-4);
            assert_close(speed_share(&r), 1.0, 1e-13);
            rig_clear(&r);
        }
    }
}

/* ---- the law as the search sees it ------------------------------------------------
 */

static void assert_law_is_sound(const rig *r, bool rises)
{
    const double step = 1e-7;
    for (int k_q = 0; k_q < 154; k_q++) {
        const double q = -0.9 + 0.0137 * k_q;
        const kent_device_law a = rig_law(r, q - step), b = rig_law(r, q + step);
        const kent_device_law l = rig_law(r, q);
        const double slope = (b.f - a.f) / (2.0 * step);
        assert_within(l.by_flow, slope, 2e-4 * (1.0 + fabs(slope)) + 0.5);
        if (rises) assert_true(l.by_flow >= 0.0);
    }
}

static void derivatives_are_those_of_differences(void **state)
{
    (void)state;
    const double speeds[] = {40.0, 40.0, 120.0, 147.0, 261.0};
    for (size_t k = 0; k < 5; k++) {
        static rig r;
        rig_pump(&r, speeds[k], 3, 3);
        r.pump.inertia = k < 2 ? 12.0 : 1.5;
        r.pump.check_valve = k == 0 ? KENT_CHECK_IDEAL : KENT_CHECK_NONE;
        r.pump.check_loss = 10.0;
        rig_event(&r, KENT_TRIP, 0.05, NAN, 1, NAN);
        rig_event(&r, KENT_TRIP, 2.0, NAN, 0, NAN);
        rig_start(&r, 3.0 * AREA, WAVE, RATED, 0.01, 200);
        assert_law_is_sound(&r, true);
        for (int i = 0; i < 20; i++) {
            march(&r, 0.5 * (i + 1));
            assert_law_is_sound(&r, true);
        }
        rig_clear(&r);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(without_an_event_nothing_changes),
        cmocka_unit_test(a_trip_is_that_of_an_independent_integration),
        cmocka_unit_test(the_run_down_behind_a_shut_valve_is_exact_to_second_order),
        cmocka_unit_test(the_rotor_loses_the_energy_it_gives),
        cmocka_unit_test(a_trip_between_steps_counts_from_its_own_time),
        cmocka_unit_test(a_rotor_without_inertia_does_not_ring),
        cmocka_unit_test(without_a_check_valve_it_runs_away_as_the_tables_say),
        cmocka_unit_test(a_stopped_pump_is_a_resistance),
        cmocka_unit_test(a_ramp_goes_to_its_share_of_the_speed),
        cmocka_unit_test(an_ideal_check_valve_lets_nothing_back),
        cmocka_unit_test(a_delayed_check_valve_slams),
        cmocka_unit_test(units_side_by_side_are_one_larger_unit),
        cmocka_unit_test(groups_with_one_history_act_as_one),
        cmocka_unit_test(one_of_three_trips),
        cmocka_unit_test(standing_units_start_one_after_another),
        cmocka_unit_test(standing_units_that_are_pushed_are_told),
        cmocka_unit_test(too_many_different_conditions_are_refused),
        cmocka_unit_test(power_restored_onto_a_turning_pump),
        cmocka_unit_test(derivatives_are_those_of_differences),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
