/* Tanks, vessels and valves that act by themselves, in a main that is marched: what
 * each is there for. Alone they are in test_tanks.c and its like. */
#include "march.h"

#include <math.h>
#include <string.h>

static const double G = 9.81, PI = 3.14159265358979323846;

/* A level at R that loses nothing, a frictionless pipe to T where water is drawn until
 * it is cut off at t = 0; what the test wants stands at T, at level 0. */
typedef struct line {
    kent_build build;
    march march;
    kent_trace trace;
    double length;
} line;

static void line_new(line *l, double level, double length, double bore,
                     double wave_speed, double flow)
{
    *l = (line){.build = kent_build_new(), .length = length};
    kent_build *b = &l->build;
    b->model->gravity = G;
    kent_build_point(b, "R", 0.0, 0.0, 0.0);
    kent_build_point(b, "T", length, 0.0, 0.0);
    kent_build_pipe(b, "main", "R T", bore, wave_speed);
    kent_build_fixed_level(b, "R", level);
    const int o = kent_build_outflow(b, "T", flow);
    const int s = kent_build_scenario(b, "cut", 1000.0);
    kent_build_ramp(b, s, KENT_EVENT_OUTFLOW, o, 0.0, 0.0, 0.0);
    b->model->solver.friction = KENT_SURGE_NONE;
}

static void line_ready(line *l)
{
    const kent_watch end = {0, l->length};
    const int last = (int)l->build.model->scenario_count - 1;
    march *m = &l->march;
    kent_error err = {0};
    kent_build_derive(&l->build);
    l->build.model->fixed_levels[0].loss = -1.0; /* no case may say so */
    m->build = &l->build;
    if (kent_steady_solve(l->build.model, &m->steady, &err) != KENT_OK ||
        kent_grid_plan(l->build.model, 1000.0, &m->grid, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    m->marcher = march_marcher(m, last, &end, 1, 1);
}

static bool line_step(line *l)
{
    kent_error err = {0};
    if (kent_marcher_advance(l->march.marcher, 1, &l->trace, &err) == 1) return true;
    fail_msg("%s", err.what);
    return false;
}

static double told(const line *l, int which) { return l->trace.devices[0].told[which]; }

static void line_clear(line *l)
{
    march_clear(&l->march);
    kent_build_clear(&l->build);
}

/* The two tanks of test_tanks.c on an elastic line of 1e5 m/s. */
static void tanks_swing_as_by_the_closed_form(void **state)
{
    (void)state;
    static const struct {
        double flow, length, bore_area, area, peak, period;
    } want[] = {{2.0, 200.0, 1.227, 12.57, 2.299, 90.8},
                {1.1780972450961724, 1000.0, 0.7853981633974483, 20.0, 3.0011, 320.12}};
    for (size_t i = 0; i < 2; i++) {
        line l;
        line_new(&l, 50.0, want[i].length, sqrt(4.0 * want[i].bore_area / PI), 1e5,
                 want[i].flow);
        kent_build_surge_tank(&l.build, "ST", "T", want[i].area);
        l.build.model->solver.time_step = 0.5 * want[i].length / 1e5;
        line_ready(&l);
        double peak = 0.0, at = 0.0;
        do {
            line_step(&l);
            const double rise = told(&l, 0) - 50.0;
            if (rise > peak) {
                peak = rise;
                at = l.trace.time[0];
            }
        } while (l.trace.time[0] < 0.3 * want[i].period);
        assert_close(peak, want[i].peak, 1e-3);
        assert_close(4.0 * at, want[i].period, 5e-3); /* the top is flat */
        line_clear(&l);
    }
}

/* The vessel of test_vessel.c on an elastic line of 1200 m/s: 1 %. */
static void a_vessel_takes_the_column_up(void **state)
{
    (void)state;
    static const double want[][3] = {{1.0, 92.995, 40.93}, {1.4, 98.866, 37.64}};
    const double gauge = 101325.0 / (1000.0 * G); /* m */
    for (size_t i = 0; i < 2; i++) {
        line l;
        line_new(&l, 60.0 - gauge, 500.0, 0.5, 1200.0, 0.25 * PI * 0.25);
        const int v = kent_build_air_vessel(&l.build, "VES1", "T", 10.0, 1.0);
        l.build.model->air_vessels[v].polytropic_exponent = want[i][0];
        l.build.model->air_vessels[v].loss_in = 0.0;
        l.build.model->air_vessels[v].loss_out = 0.0;
        line_ready(&l);
        double highest = 0.0, lowest = 1e9, into = 0.0, before = 0.0, last = 0.0;
        do {
            line_step(&l);
            const double flow = l.trace.devices[0].flow;
            into += 0.5 * (l.trace.time[0] - last) * (before + flow);
            last = l.trace.time[0];
            before = flow;
            assert_within(1.0 - told(&l, 0), into, 1e-9); /* water that it holds */
            highest = fmax(highest, l.trace.head[0] + gauge);
            lowest = fmin(lowest, l.trace.head[0] + gauge);
        } while (last < 20.0);
        assert_close(highest, want[i][1], 0.01);
        assert_close(lowest, want[i][2], 0.01);
        line_clear(&l);
    }
}

/* 1.5 m/s cut off at once in 2 km would raise the head by a V/g = 153 m; the relief
 * valve's is that of its opening, between set and full. */
static void a_relief_valve_holds_its_set_pressure(void **state)
{
    (void)state;
    const double set = 70.0, capacity = 0.3; /* m, m^2.5/s */
    line l;
    line_new(&l, 50.0, 2000.0, 0.5, 1000.0, 1.5 * 0.25 * PI * 0.25);
    kent_build_relief_valve(&l.build, "RV", "T", set * 1000.0 * G, capacity);
    line_ready(&l);
    double highest = 0.0, least = 1.0, discharged = 0.0, before = 0.0, last = 0.0;
    do {
        line_step(&l);
        const double x = told(&l, 0), head = l.trace.head[0];
        const double flow = l.trace.devices[0].flow;
        assert_within(flow, capacity * x * sqrt(fmax(head, 0.0)), 1e-8);
        if (l.trace.time[0] > 0.1 && l.trace.time[0] < 3.9) least = fmin(least, x);
        discharged += 0.5 * (l.trace.time[0] - last) * (before + flow);
        before = flow;
        last = l.trace.time[0];
        assert_within(told(&l, 1), discharged, 1e-9);
        highest = fmax(highest, head);
    } while (last < 30.0);
    assert_true(highest > set && highest < 1.1 * set);
    assert_true(least > 0.1); /* open while the column pushes */
    line_clear(&l);
}

/* R 100 m - K - E, and a draw at E that grows by a fifth in 30 s: behind the valve at K
 * the pressure stays; at E only the pipe between is felt. */
static void a_reducing_valve_holds_the_pressure_behind_it(void **state)
{
    (void)state;
    const kent_watch at[2] = {{1, 0.0}, {0, 800.0}};
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "K", 800.0, 0.0, 0.0);
    kent_build_point(&b, "E", 1600.0, 0.0, 0.0);
    kent_build_pipe(&b, "1", "R K", 0.4, 1000.0);
    kent_build_pipe(&b, "2", "K E", 0.4, 1000.0);
    kent_build_fixed_level(&b, "R", 100.0);
    const int o = kent_build_outflow(&b, "E", 0.10);
    kent_build_control_valve(&b, "PR1", "K", "E", KENT_HOLDS_DOWNSTREAM,
                             50.0 * 1000.0 * b.model->gravity);
    b.model->control_valves[0].opening_time = 2.0; /* no friction: waves stay steep */
    b.model->control_valves[0].closure_time = 2.0;
    const int s = kent_build_scenario(&b, "more", 100.0);
    kent_build_ramp(&b, s, KENT_EVENT_OUTFLOW, o, 1.0, 30.0, 0.12);
    march m = march_new(&b, 100.0, s, at, 2, 1);
    kent_trace trace;
    kent_error err = {0};
    double first = NAN, last = NAN, most = 0.0;
    do {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        assert_within(trace.head[0], 50.0, 1e-8);
        assert_close(trace.flow[0], trace.devices[0].flow, 1e-9);
        last = trace.devices[0].told[0];
        if (isnan(first)) first = last;
        most = fmax(most, last);
        const double drop = trace.head[1] - trace.head[0];
        assert_within(trace.devices[0].flow, 0.1 * last * sqrt(drop), 1e-8);
    } while (trace.time[0] < 40.0);
    assert_true(most > 1.15 * first);
    march_clear(&m);
    kent_build_clear(&b);
}

/* The draw at T goes up to more than the level can give: the head falls, the tank
 * behind its check valve feeds, and is left with what it has not given. */
static void a_one_way_tank_keeps_the_head_near_its_level(void **state)
{
    (void)state;
    line l;
    line_new(&l, 50.0, 2000.0, 0.5, 1000.0, 0.0);
    kent_build_one_way_tank(&l.build, "FT", "T", 12.0, 45.0);
    l.build.model->events[0].to = 0.25; /* m3/s drawn, from nothing */
    line_ready(&l);
    double lowest = 1e9, fed = 0.0, before = 0.0, last = 0.0;
    do {
        line_step(&l);
        const double flow = l.trace.devices[0].flow;
        assert_true(flow <= 0.0);
        fed -= 0.5 * (l.trace.time[0] - last) * (before + flow);
        before = flow;
        last = l.trace.time[0];
        assert_within(told(&l, 0), 45.0 - fed / 12.0, 1e-10);
        if (last > 0.0) lowest = fmin(lowest, l.trace.head[0]);
    } while (last < 20.0);
    /* without it: 50 - a Q/(g A) = -80 m; what it gives costs 4 V2/2g in 300 mm */
    const double loss = 4.0 * pow(0.25 / (0.25 * PI * 0.09), 2.0) / (2.0 * G);
    assert_true(lowest > 45.0 - fed / 12.0 - loss && lowest < 45.0 && fed > 0.1);
    line_clear(&l);
}

/* A summit of 30 m on the way down; the draw at its end goes up at once, then stops:
 * the column parts there, and comes together with a rise of a V/g of what arrives,
 * shared by the two pipes. */
static void an_air_valve_slams_as_the_last_air_leaves(void **state)
{
    (void)state;
    const kent_watch at = {0, 1000.0};
    static const kent_law_point law[] = {
        {0.0, 0.0}, {1.0, 0.3}, {6.0, 0.3}, {8.0, 0.0}};
    kent_build b = kent_build_new();
    b.model->gravity = G;
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "C", 1000.0, 0.0, 30.0);
    kent_build_point(&b, "E", 2000.0, 0.0, -60.0);
    kent_build_pipe(&b, "1", "R C", 0.5, 1000.0);
    kent_build_pipe(&b, "2", "C E", 0.5, 1000.0);
    b.model->pipes[0].length = b.model->pipes[1].length = 1000.0;
    kent_build_fixed_level(&b, "R", 40.0);
    const int o = kent_build_outflow(&b, "E", 0.0);
    kent_build_air_valve(&b, "A1", "C", 0.15, 0.15);
    const int s = kent_build_scenario(&b, "draw", 200.0);
    kent_build_law(&b, s, KENT_EVENT_OUTFLOW, o, 0.0, law, 4);
    b.model->solver.friction = KENT_SURGE_NONE;
    march m = march_new(&b, 200.0, s, &at, 1, 1);
    kent_trace trace;
    kent_error err = {0};
    const double y = 2.0 * G * 0.25 * PI * 0.25 / 1000.0; /* m2/s of both pipes */
    const double step = m.grid->step;
    double volume = 0.0, most = 0.0, c = 0.0, per_step = 0.0; /* m3, m3, m, m */
    bool shut = false;
    while (!shut) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        const kent_device_row *valve = &trace.devices[0];
        const double before = volume;
        if (before > 0.0 && valve->told[0] == 0.0) {
            shut = true; /* in this step; the flow is nil at the next */
        } else {
            volume = valve->told[0];
            assert_within(volume, before - step * valve->flow, 1e-9);
            const double now = trace.head[0] + valve->flow / y; /* without a valve */
            per_step = now - c;
            c = now;
        }
        most = fmax(most, volume);
        assert_true(trace.head[0] >= 30.0 - 3.0); /* the vacuum is broken */
    }
    /* From 30 m to what arrives, a V/g of each pipe in balance; the waves themselves
     * have gone on by two steps since. */
    assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
    assert_true(trace.devices[0].flow == 0.0);
    assert_close(trace.head[0], c + 2.0 * per_step, 1e-3);
    assert_true(trace.head[0] > 50.0 && most > 0.1);
    march_clear(&m);
    kent_build_clear(&b);
}

/* At T a hole: the first answer is H = H0 - Q/Y with Q = C A sqrt(2 g H). */
static void a_burst_sends_out_the_wave_of_what_it_lets_out(void **state)
{
    (void)state;
    line l;
    line_new(&l, 50.0, 2000.0, 0.5, 1000.0, 0.0);
    const int s = kent_build_scenario(&l.build, "burst", 10.0);
    kent_build_burst(&l.build, "T");
    const int e = kent_build_ramp(&l.build, s, KENT_EVENT_BURST, 0, 0.0, 0.0, 0.01);
    l.build.model->events[e].coefficient = 0.6;
    line_ready(&l);
    line_step(&l);
    const double y = G * 0.25 * PI * 0.25 / 1000.0, e2 = 0.6 * 0.01 * sqrt(2.0 * G);
    const double root = 0.5 * (sqrt(e2 * e2 / (y * y) + 200.0) - e2 / y);
    while (l.trace.time[0] < 3.9) {
        line_step(&l);
        assert_close(l.trace.head[0], root * root, 1e-10);
        assert_close(l.trace.devices[0].flow, e2 * root, 1e-10);
    }
    assert_null(kent_marcher_caution(l.march.marcher, 0));
    line_clear(&l);
}

/* A tide at R reaches T, a dead end, doubled, after L/a. */
static void a_level_that_varies_sends_its_waves(void **state)
{
    (void)state;
    static const kent_law_point law[] = {{0.0, 50.0}, {1.0, 52.0}, {2.0, 50.0}};
    line l;
    line_new(&l, 50.0, 2000.0, 0.5, 1000.0, 0.0);
    const int s = kent_build_scenario(&l.build, "tide", 10.0);
    const int e = kent_build_law(&l.build, s, KENT_EVENT_FIXED_LEVEL, 0, 0.0, law, 3);
    l.build.model->events[e].period = 4.0;
    line_ready(&l);
    while (line_step(&l) && l.trace.time[0] < 5.9) {
        const double t = l.trace.time[0] - 2.0; /* s, since it set out */
        const double rise = t < 0.0 || t > 2.0 ? 0.0 : 2.0 - 2.0 * fabs(t - 1.0);
        assert_within(l.trace.head[0], 50.0 + 2.0 * rise, 1e-9);
    }
    line_clear(&l);
}

static void what_happened_beside_the_main_is_said(void **state)
{
    (void)state;
    line l;
    line_new(&l, 50.0, 500.0, 0.5, 1000.0, 0.4);
    const int t = kent_build_surge_tank(&l.build, "ST", "T", 2.0);
    l.build.model->surge_tanks[t].overflow_level = 50.5;
    line_ready(&l);
    line_step(&l);
    assert_null(kent_marcher_caution(l.march.marcher, 0));
    while (l.trace.time[0] < 10.0) {
        line_step(&l);
    }
    assert_non_null(strstr(kent_marcher_caution(l.march.marcher, 0), "overflows"));
    assert_true(told(&l, 1) > 0.1);
    line_clear(&l);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(tanks_swing_as_by_the_closed_form),
        cmocka_unit_test(a_vessel_takes_the_column_up),
        cmocka_unit_test(a_relief_valve_holds_its_set_pressure),
        cmocka_unit_test(a_reducing_valve_holds_the_pressure_behind_it),
        cmocka_unit_test(a_one_way_tank_keeps_the_head_near_its_level),
        cmocka_unit_test(an_air_valve_slams_as_the_last_air_leaves),
        cmocka_unit_test(a_burst_sends_out_the_wave_of_what_it_lets_out),
        cmocka_unit_test(a_level_that_varies_sends_its_waves),
        cmocka_unit_test(what_happened_beside_the_main_is_said),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
