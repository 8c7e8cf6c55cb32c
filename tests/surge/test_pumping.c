/* Pumping mains marched whole: what stands alone in test_at_pump, among pipes. */
#include "march.h"

#include <math.h>
#include <string.h>

static const double G = 9.81;

typedef struct main_of {
    kent_build b;
    int pump, scenario;
    march m;
} main_of;

/* The pump of the rig in test_at_pump: 200 L/s at 50 m, 84 %, N_s 40, 12 kg m2. */
static void set_curve(kent_model *m, kent_pump *p)
{
    const double share[] = {0.0, 0.5, 1.0, 1.25, 1.5};
    const double head[] = {62.5, 59.0, 50.0, 42.5, 31.0};
    const double efficiency[] = {0.0, 0.68, 0.84, 0.80, 0.66};
    kent_pump_curve *c = &p->curve;
    c->count = 5;
    c->rated_efficiency = 0.84;
    for (size_t i = 0; i < c->count; i++) {
        c->flow[i] = share[i] * c->rated_flow;
        c->head[i] = head[i];
        c->efficiency[i] = efficiency[i];
    }
    c->rated_speed =
        40.0 * pow(c->rated_head, 0.75) / sqrt(c->rated_flow) * acos(-1.0) / 30.0;
    p->inertia = 12.0;
    assert_null(kent_pump_curve_complete(c, m->water.density, m->gravity));
}

/* From a suction level of 0 m up 1000 m of main, bore so wide that A = 0.14 m2, to a
 * level of 50 m: the rated point, there being no friction. */
static void lift(main_of *l, int in_parallel)
{
    l->b = kent_build_new();
    kent_build *b = &l->b;
    b->model->gravity = G;
    b->model->water.density = 1000.0;
    b->model->solver.time_step = 0.01;
    b->model->solver.friction = KENT_SURGE_NONE;
    kent_build_point(b, "P", 0.0, 0.0, 0.0);
    kent_build_point(b, "R", 1000.0, 0.0, 0.0);
    kent_build_pipe(b, "main", "P R", sqrt(in_parallel * 0.14 * 4.0 / acos(-1.0)),
                    1000.0);
    kent_build_fixed_level(b, "R", 50.0);
    l->pump = kent_build_pump(b, "PS", "P", NULL, 62.5, 0.2, 50.0);
    kent_pump *p = &b->model->pumps[l->pump];
    p->suction_level = 0.0;
    p->in_parallel = p->running = in_parallel;
    set_curve(b->model, p);
    l->scenario = kent_build_scenario(b, "s", 400.0);
}

static void add(main_of *l, kent_action action, double start_time, double ramp_time,
                int how_many)
{
    const int e = kent_build_ramp(&l->b, l->scenario, KENT_EVENT_PUMP, l->pump,
                                  start_time, ramp_time, NAN);
    l->b.model->events[e].action = action;
    l->b.model->events[e].how_many = how_many;
}

static void begin(main_of *l, double duration)
{
    const kent_watch at = {0, 0.0};
    l->m = march_new(&l->b, duration, l->scenario, &at, 1, 1);
}

static void finish(main_of *l)
{
    march_clear(&l->m);
    kent_build_clear(&l->b);
}

typedef struct now {
    double time, head, flow; /* at the pump's delivery */
    kent_device_row device;
} now;

static now next(main_of *l, size_t device)
{
    kent_trace t;
    kent_error err = {0};
    assert_int_equal(kent_marcher_advance(l->m.marcher, 1, &t, &err), 1);
    assert_true(device < t.device_count);
    return (now){t.time[0], t.head[0], t.flow[0], t.devices[device]};
}

/* The values of test_at_pump, from an independent integration, now by the whole march;
 * until the level at the far end, whose outflow loses V2/2g, is felt. */
static void a_trip_up_a_main_is_that_of_an_independent_integration(void **state)
{
    (void)state;
    static const double rows[][4] = {
        /* s, m3/s, share of speed, m */
        {1, 0.1682955, 0.7564493, 26.91532},
        {2, 0.1521273, 0.6010088, 15.14291},
        {4, 0.0513926, 0.4451035, 11.51020},
        {6, -0.0524194, 0.3778291, 12.90219},
    };
    main_of l;
    lift(&l, 1);
    add(&l, KENT_TRIP, 0.0, NAN, 0);
    begin(&l, 21.0);
    const double rated = l.b.model->pumps[0].curve.rated_speed;
    for (size_t i = 0; i < 4;) {
        const now n = next(&l, 0);
        if (fabs(n.time - rows[i][0]) > 1e-9) continue;
        assert_within(n.flow, rows[i][1], 1e-4 * 0.2);
        assert_within(n.device.flow, n.flow, 1e-12);
        assert_within(n.device.told[0] / rated, rows[i][2], 1e-4);
        assert_within(n.head, rows[i][3], 1e-4 * 50.0);
        i++;
    }
    finish(&l);
}

/* With friction, a booster in line and a check valve further on: nothing moves by
 * itself. */
static void without_an_event_nothing_changes(void **state)
{
    (void)state;
    for (int standing = 0; standing < 2; standing++) {
        main_of l = {.b = kent_build_new()};
        kent_build *b = &l.b;
        kent_build_point(b, "A", 0.0, 0.0, 0.0);
        kent_build_point(b, "B", 500.0, 0.0, 0.0);
        kent_build_point(b, "C", 900.0, 0.0, 0.0);
        kent_build_point(b, "D", 1700.0, 0.0, 0.0);
        const char *routes[] = {"A B", "B C", "C D"};
        for (int i = 0; i < 3; i++) {
            const int p = kent_build_pipe(b, routes[i], routes[i], 0.4, 1000.0);
            b->model->pipes[p].friction = KENT_DARCY_FIXED;
            b->model->pipes[p].friction_coefficient = 0.02;
        }
        kent_build_fixed_level(b, "A", 20.0);
        kent_build_fixed_level(b, "D", 50.0);
        const int p = kent_build_pump(b, "booster", "B", "C", 50.0, 0.15, 40.0);
        kent_build_check_valve(b, "NR", "C", "D");
        b->model->pumps[p].in_parallel = 3;
        b->model->pumps[p].running = 2;
        if (standing == 1) {
            b->model->pumps[p].check_valve = KENT_CHECK_IDEAL;
            b->model->pumps[p].check_loss = 40.0;
        }
        l.scenario = kent_build_scenario(b, "s", 1e3);
        begin(&l, 200.0);
        const now first = next(&l, 0);
        for (int i = 0; i < 20000; i++) {
            const now n = next(&l, 0);
            assert_within(n.head, first.head, 1e-9);
            assert_within(n.flow, first.flow, 1e-10);
            assert_within(n.device.flow, first.device.flow, 1e-10);
            assert_close(n.device.told[0], first.device.told[0], 1e-15);
        }
        finish(&l);
    }
}

/* A booster that trips: the head before it rises, behind it falls, and what passes
 * reaches the valve behind, which shuts where the returning wave would reverse it. */
static void a_booster_trips_between_two_mains(void **state)
{
    (void)state;
    main_of l = {.b = kent_build_new()};
    kent_build *b = &l.b;
    kent_build_point(b, "A", 0.0, 0.0, 0.0);
    kent_build_point(b, "B", 800.0, 0.0, 0.0);
    kent_build_point(b, "C", 2000.0, 0.0, 0.0);
    const char *routes[] = {"A B", "B C"};
    for (int i = 0; i < 2; i++) {
        (void)kent_build_pipe(b, routes[i], routes[i], 0.4, 1000.0);
    }
    kent_build_fixed_level(b, "A", 30.0);
    kent_build_fixed_level(b, "C", 70.0);
    l.pump = kent_build_pump(b, "booster", "B", "C", 50.0, 0.15, 40.0);
    b->model->pumps[l.pump].check_valve = KENT_CHECK_IDEAL;
    b->model->pumps[l.pump].inertia = 1.0;
    b->model->solver.friction = KENT_SURGE_NONE;
    b->model->solver.time_step = 0.01;
    l.scenario = kent_build_scenario(b, "s", 60.0);
    add(&l, KENT_TRIP, 0.5, NAN, 0);
    const kent_watch at[2] = {{0, 800.0}, {1, 0.0}};
    l.m = march_new(b, 60.0, l.scenario, at, 2, 1);
    double before = -1e9, behind = 1e9, forward = 0.0, flow = 0.0;
    kent_trace t;
    kent_error err = {0};
    for (int i = 0; i < 5900; i++) {
        assert_int_equal(kent_marcher_advance(l.m.marcher, 1, &t, &err), 1);
        before = fmax(before, t.head[0]);
        behind = fmin(behind, t.head[1]);
        assert_within(t.flow[0], t.flow[1], 1e-10);
        assert_true(t.devices[0].flow > -1e-12);
        if (i == 0) flow = t.flow[0];
        forward = fmax(forward, t.devices[0].flow);
    }
    /* all the flow stopped at once would make a V/g on either side; the pump brings
     * it to a stop over several returns of the wave */
    const double joukowsky = 1000.0 / 9.80665 * 0.15 / (0.25 * acos(-1.0) * 0.16);
    assert_true(before > 45.0 && before < 30.0 + joukowsky);
    assert_true(behind < 55.0 && behind > 70.0 - joukowsky);
    assert_close(forward, flow, 1e-9);
    finish(&l);
}

/* One of three trips and its valve shuts; it is started again into what returns, and
 * all is as before. The same whatever the step. */
static double highest_of_a_restart(double step, double *last)
{
    main_of l;
    double highest = 0.0;
    lift(&l, 3);
    l.b.model->solver.time_step = step;
    l.b.model->pumps[l.pump].check_valve = KENT_CHECK_IDEAL;
    add(&l, KENT_TRIP, 0.0, NAN, 0);
    add(&l, KENT_START, 8.0, 1.0, 2);
    add(&l, KENT_START, 16.0, 1.0, 0);
    begin(&l, 300.0);
    for (now n = {0}; n.time < 299.0;) {
        n = next(&l, 0);
        highest = fmax(highest, n.head);
        assert_true(n.flow > -1e-12);
        *last = n.flow;
    }
    finish(&l);
    return highest;
}

static void a_restart_into_the_returning_wave(void **state)
{
    (void)state;
    double last = 0.0;
    const double coarse = highest_of_a_restart(0.02, &last);
    assert_close(last, 0.6, 1e-3);
    const double fine = highest_of_a_restart(0.01, &last);
    assert_true(coarse > 70.0); /* more than shut-off: the wave adds to it */
    assert_within(coarse, fine, 0.2);
}

/* While the water is parted in the pipe, what devices tell goes on: a pump without
 * power slows down at every step, and its flow is that of the pipe at its delivery. */
static void a_pump_is_told_while_the_water_is_parted(void **state)
{
    (void)state;
    main_of l;
    double volume[101];
    size_t parted = 0;
    lift(&l, 1);
    l.b.model->solver.column_separation = KENT_SEPARATION_GAS;
    l.b.model->points[1].at.z = 49.0; /* the wave leaves less there */
    l.b.model->pumps[l.pump].inertia = 1.0;
    l.b.model->pumps[l.pump].check_valve = KENT_CHECK_IDEAL;
    add(&l, KENT_TRIP, 0.0, NAN, 0);
    begin(&l, 8.0);
    assert_int_equal(l.m.grid->reaches[0], 100);
    double speed = INFINITY;
    for (now n = {0}; n.time < 6.0;) {
        n = next(&l, 0);
        assert_true(n.device.told[0] < speed || n.time <= 0.01);
        assert_within(n.device.flow, n.flow, 1e-4); /* gas at the node takes some */
        speed = n.device.told[0];
        kent_marcher_hollow(l.m.marcher, 0, volume);
        for (size_t i = 0; i < 101; i++) {
            parted += volume[i] > 1e-6;
        }
    }
    assert_true(parted > 100);
    finish(&l);
}

/* The longer the valve stays open after the flow reversed, the faster is what it stops,
 * until the water that runs back is no longer sped up. */
static void slam_grows_with_the_delay(void **state)
{
    (void)state;
    double before = 0.0;
    for (int k_delay = 0; k_delay < 6; k_delay++) {
        const double delay = 0.05 + 0.05 * k_delay;
        main_of l;
        double slam = 0.0;
        lift(&l, 1);
        kent_pump *p = &l.b.model->pumps[l.pump];
        p->check_valve = KENT_CHECK_DELAYED;
        p->check_delay = delay;
        p->check_size = 0.4;
        p->inertia = 1.0;
        add(&l, KENT_TRIP, 0.0, NAN, 0);
        begin(&l, 30.0);
        for (now n = {0}; n.time < 20.0;) {
            n = next(&l, 0);
            slam = n.device.told[2];
        }
        assert_true(slam > before);
        before = slam;
        finish(&l);
    }
}

/* A check valve between two mains from 60 m to 40 m; the level before it falls to 10 m
 * in 30 s. The valve shuts as the flow ends and holds the rest back; with a delay what
 * runs back is stopped, and its head jumps by a V/g. */
static void a_check_valve_in_line_holds_the_water_back(void **state)
{
    (void)state;
    static const kent_law_point fall[] = {{0.0, 60.0}, {30.0, 10.0}};
    for (int delayed = 0; delayed < 2; delayed++) {
        kent_build b = kent_build_new();
        kent_build_point(&b, "A", 0.0, 0.0, 0.0);
        kent_build_point(&b, "B", 500.0, 0.0, 0.0);
        kent_build_point(&b, "C", 1000.0, 0.0, 0.0);
        const char *routes[] = {"A B", "B C"};
        for (int i = 0; i < 2; i++) {
            const int p = kent_build_pipe(&b, routes[i], routes[i], 0.3, 1000.0);
            b.model->pipes[p].friction = KENT_DARCY_FIXED;
            b.model->pipes[p].friction_coefficient = 0.02;
        }
        const int from = kent_build_fixed_level(&b, "A", 60.0);
        kent_build_fixed_level(&b, "C", 40.0);
        const int v = kent_build_check_valve(&b, "NR", "B", "C");
        b.model->check_valves[v].delay = delayed ? 0.3 : 0.0;
        b.model->solver.time_step = 0.01;
        b.model->solver.friction = KENT_SURGE_QUASI_STEADY;
        const int s = kent_build_scenario(&b, "fall", 120.0);
        kent_build_law(&b, s, KENT_EVENT_FIXED_LEVEL, from, 1.0, fall, 2);
        const kent_watch at[2] = {{0, 500.0}, {1, 0.0}};
        march m = march_new(&b, 120.0, s, at, 2, 1);
        const double area = 0.25 * acos(-1.0) * 0.09;
        double head = 0.0, jump = 0.0, before = 0.0, slam = 0.0, mean[2] = {0};
        size_t counted = 0;
        kent_trace t;
        kent_error err = {0};
        for (int i = 0; i < 11900; i++) {
            assert_int_equal(kent_marcher_advance(m.marcher, 1, &t, &err), 1);
            assert_within(t.flow[0], t.flow[1], 1e-10);
            slam = t.devices[0].told[0];
            if (before < -1e-6 && fabs(t.flow[1]) < 1e-12) {
                jump = t.head[1] - head;
                break; /* what it does then is of waves that open it again */
            }
            before = t.flow[1];
            head = t.head[1];
            if (t.time[0] > 99.0) { /* ten times there and back, twice */
                mean[0] += t.head[0];
                mean[1] += t.head[1];
                counted++;
            }
            if (!delayed) assert_true(before > -1e-12);
        }
        if (delayed) {
            assert_true(slam > 0.0);
            assert_close(slam, -before / area, 1e-9); /* on its own size, 300 mm */
            /* but for what the wave that arrives brings in that step */
            assert_close(jump, 1000.0 / 9.80665 * slam, 0.05);
        } else {
            assert_true(slam == 0.0);
            assert_within(mean[0] / (double)counted, 10.0, 0.01); /* waves die slowly */
            assert_within(mean[1] / (double)counted, 40.0, 0.01);
        }
        march_clear(&m);
        kent_build_clear(&b);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_trip_up_a_main_is_that_of_an_independent_integration),
        cmocka_unit_test(without_an_event_nothing_changes),
        cmocka_unit_test(a_booster_trips_between_two_mains),
        cmocka_unit_test(a_restart_into_the_returning_wave),
        cmocka_unit_test(a_pump_is_told_while_the_water_is_parted),
        cmocka_unit_test(slam_grows_with_the_delay),
        cmocka_unit_test(a_check_valve_in_line_holds_the_water_back),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
