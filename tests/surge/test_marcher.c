#include "ledger.h"
#include "march.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* A looped network with everything in it: two levels, a loop, a branch to a dead end
 * at rest, a valve in line, one that discharges, an outflow of either kind. Invented.
 * raised: m, everything lies higher by this. */
static kent_build town(double raised, kent_surge_friction friction)
{
    static const struct {
        const char *id;
        double x, y, z;
    } point[] = {{"R", 0, 0, 40},      {"A", 600, 0, 20},    {"B", 1100, 300, 10},
                 {"C", 1100, -350, 5}, {"D", 1600, 0, 0},    {"E", 2100, 50, -5},
                 {"X", 700, 800, 15},  {"S", 1900, 500, 30}, {"W", 900, 150, 14}};
    static const struct {
        const char *route;
        double bore, speed;
    } pipe[] = {{"R A", 0.5, 1050.0},  {"A W B", 0.35, 1100.0}, {"A C", 0.3, 1150.0},
                {"B D", 0.3, 1120.0},  {"C D", 0.25, 1180.0},   {"D E", 0.3, 1000.0},
                {"B X", 0.15, 1200.0}, {"S D", 0.3, 1080.0}};
    kent_build b = kent_build_new();
    for (size_t i = 0; i < sizeof point / sizeof point[0]; i++) {
        kent_build_point(&b, point[i].id, point[i].x, point[i].y, point[i].z + raised);
    }
    for (size_t i = 0; i < sizeof pipe / sizeof pipe[0]; i++) {
        const int p = kent_build_pipe(&b, pipe[i].route, pipe[i].route, pipe[i].bore,
                                      pipe[i].speed);
        b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
        b.model->pipes[p].friction_coefficient = 0.0002;
        b.model->pipes[p].loss = 1.5;
    }
    const int level = kent_build_fixed_level(&b, "R", 75.0 + raised);
    b.model->fixed_levels[level].loss = 0.5;
    kent_build_fixed_level(&b, "S", 70.0 + raised);
    kent_build_outflow(&b, "C", 0.03);
    const int o = kent_build_outflow(&b, "D", 0.05);
    b.model->outflows[o].pressure_dependent = true;
    b.model->outflows[o].full_pressure = 9e5;
    const int in_line = kent_build_valve(&b, "VW", "W", 0.08, (double)NAN);
    const int out = kent_build_valve(&b, "VE", "E", 0.02, raised);
    const int s = kent_build_scenario(&b, "shut", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, out, 0.5, 4.0, 0.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, in_line, 6.0, 3.0, 0.2);
    kent_build_ramp(&b, s, KENT_EVENT_OUTFLOW, 0, 2.0, 5.0, 0.0);
    b.model->solver.friction = friction;
    b.model->solver.min_reaches = 6;
    return b;
}

static const kent_watch WATCHES[] = {{0, 0.0}, {5, 501.0}, {3, 123.4}, {7, 40.0}};
enum { WATCH_COUNT = sizeof WATCHES / sizeof WATCHES[0] };

static void run(kent_marcher *k, size_t steps, size_t block)
{
    kent_trace trace;
    kent_error err = {0};
    for (size_t done = 0; done < steps; done += trace.count) {
        const size_t want = steps - done < block ? steps - done : block;
        if (kent_marcher_advance(k, want, &trace, &err) != want) {
            fail_msg("%s", err.what);
        }
    }
}

static double largest_swing(const march *m, kent_marcher *k)
{
    double worst = 0.0; /* m */
    for (size_t s = 0; s < m->build->model->span_count; s++) {
        const size_t n = (size_t)m->grid->reaches[s] + 1;
        double *high = kent_alloc(2 * n, sizeof *high), *low = high + n;
        assert_non_null(high);
        kent_marcher_envelope(k, (int)s, high, low);
        for (size_t i = 0; i < n; i++) {
            assert_true(high[i] >= low[i]);
            worst = fmax(worst, high[i] - low[i]);
        }
        free(high);
    }
    return worst;
}

static void without_an_event_nothing_changes(void **state)
{
    (void)state;
    static const kent_surge_friction friction[] = {KENT_SURGE_CONSTANT,
                                                   KENT_SURGE_QUASI_STEADY};
    for (int i = 0; i < 2; i++) {
        kent_build b = town(0.0, friction[i]);
        march m = march_new(&b, 60.0, -1, WATCHES, WATCH_COUNT, 1000);
        double fastest = 0.0;
        for (size_t s = 0; s < b.model->span_count; s++) {
            fastest =
                fmax(fastest, fabs(m.steady->span_flow[s]) / b.model->spans[s].area);
        }
        assert_true(fastest > 0.5); /* m/s: the water does flow */
        run(m.marcher, 100001, 1000);
        assert_within(largest_swing(&m, m.marcher), 0.0, 1e-9);
        march_clear(&m);
        kent_build_clear(&b);
    }
}

/* Where hardly anything flows, where the table of friction factors
 * is coarse (laminar), where the law has corners, and in rough turbulent flow. */
static void a_flow_of_any_reynolds_number_stands_still(void **state)
{
    (void)state;
    static const double fall[] = {1e-6, 2e-3, 8.25, 16.0, 60.0, 6000.0}; /* m */
    static const double least[] = {0.0, 0.1, 2000.0, 2500.0, 4000.0, 50000.0};
    static const double most[] = {0.001, 1.0, 2500.0, 4000.0, 10000.0, 200000.0};
    for (int i = 0; i < 6; i++) {
        kent_build b = kent_build_new();
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "S", 10000.0, 0.0, 0.0);
        const int p = kent_build_pipe(&b, "main", "R S", 0.02, 1000.0);
        b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
        b.model->pipes[p].friction_coefficient = 1e-4;
        kent_build_fixed_level(&b, "R", 20.0 + fall[i]);
        kent_build_fixed_level(&b, "S", 20.0);
        b.model->solver.friction = KENT_SURGE_QUASI_STEADY;
        b.model->solver.min_reaches = 200;
        march m = march_new(&b, 60.0, -1, WATCHES, 1, 1000);
        const kent_span *span = &b.model->spans[0];
        const double flow = m.steady->span_flow[0], speed = fabs(flow) / span->area;
        const double impedance =
            m.grid->wave_speed_used[0] / (b.model->gravity * span->area); /* s/m2 */
        double now_head[201], now_flow[201];
        const double reynolds = speed * span->bore / span->friction.kinematic_viscosity;
        print_message("fall %g m: Reynolds number %g\n", fall[i], reynolds);
        assert_true(reynolds >= least[i] && reynolds <= most[i]);
        assert_int_equal(m.grid->reaches[0], 200);
        run(m.marcher, 20001, 1000);
        assert_within(largest_swing(&m, m.marcher), 0.0, 1e-9);
        kent_marcher_profile(m.marcher, 0, now_head, now_flow);
        for (int j = 0; j <= 200; j++) {
            assert_within(impedance * (now_flow[j] - flow), 0.0, 1e-9);
        }
        march_clear(&m);
        kent_build_clear(&b);
    }
}

static void the_first_instant_is_the_steady_state(void **state)
{
    (void)state;
    kent_build b = town(0.0, KENT_SURGE_QUASI_STEADY);
    march m = march_new(&b, 60.0, 0, WATCHES, WATCH_COUNT, 4);
    kent_trace trace;
    kent_error err = {0};
    assert_int_equal(kent_marcher_advance(m.marcher, 3, &trace, &err), 3);
    assert_int_equal(trace.watch_count, WATCH_COUNT);
    for (size_t i = 0; i < 3; i++) {
        assert_true(trace.time[i] == (double)i * m.grid->step);
    }
    for (size_t i = 0; i < WATCH_COUNT; i++) {
        const int span = WATCHES[i].span;
        assert_within(trace.head[i],
                      kent_steady_head(b.model, m.steady, span, WATCHES[i].chainage),
                      1e-10);
        assert_within(trace.flow[i], m.steady->span_flow[span], 1e-13);
    }
    march_clear(&m);
    kent_build_clear(&b);
}

static void raising_everything_raises_the_heads_and_nothing_else(void **state)
{
    (void)state;
    const double by = 250.0; /* m */
    double head[2][WATCH_COUNT], flow[2][WATCH_COUNT];
    for (int i = 0; i < 2; i++) {
        kent_build b = town(i * by, KENT_SURGE_CONSTANT);
        march m = march_new(&b, 60.0, 0, WATCHES, WATCH_COUNT, 1);
        kent_trace trace;
        kent_error err = {0};
        run(m.marcher, 1200, 1);
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        memcpy(head[i], trace.head, sizeof head[i]);
        memcpy(flow[i], trace.flow, sizeof flow[i]);
        march_clear(&m);
        kent_build_clear(&b);
    }
    for (size_t i = 0; i < WATCH_COUNT; i++) {
        assert_within(head[1][i] - head[0][i], by, 1e-8);
        assert_within(flow[1][i], flow[0][i], 1e-11);
    }
}

/* Every head of a run, in order of span, and of the trace's last row. */
static double *heads_of(const march *m, kent_marcher *k, size_t block)
{
    double *all = kent_alloc(2 * m->grid->node_total, sizeof *all), *to = all;
    assert_non_null(all);
    run(k, 900, block);
    for (size_t s = 0; s < m->build->model->span_count; s++) {
        const size_t n = (size_t)m->grid->reaches[s] + 1;
        kent_marcher_profile(k, (int)s, to, to + n);
        to += 2 * n;
    }
    return all;
}

static void kernels_and_block_sizes_give_the_same_bits(void **state)
{
    (void)state;
    static const char *const level[] = {"base", "avx2", "avx512"};
    static const size_t block[] = {1, 7, 900};
    kent_build b = town(0.0, KENT_SURGE_QUASI_STEADY);
    march m = march_new(&b, 60.0, 0, WATCHES, WATCH_COUNT, 1024);
    double *want = heads_of(&m, m.marcher, 1024);
    for (int i = 0; i < 3; i++) {
        kent_marcher *k = NULL;
        kent_error err = {0};
        assert_int_equal(setenv("KENTLEDGE_SIMD", level[i], 1), 0);
        if (kent_marcher_new(b.model, m.steady, m.grid, 0, WATCHES, WATCH_COUNT,
                             block[i], &k, &err) != KENT_OK) {
            print_message("not compared: %s\n", err.what);
            assert_true(i > 0); /* base is always there */
            continue;
        }
        assert_string_equal(kent_marcher_kernel(k), level[i]);
        double *got = heads_of(&m, k, block[i]);
        assert_memory_equal(got, want, 2 * m.grid->node_total * sizeof *got);
        free(got);
        kent_marcher_free(k);
    }
    assert_int_equal(unsetenv("KENTLEDGE_SIMD"), 0);
    free(want);
    march_clear(&m);
    kent_build_clear(&b);
}

/* Frictionless. */
static double held(const march *m, int span)
{
    const size_t n = (size_t)m->grid->reaches[span];
    double *head = kent_alloc(2 * (n + 1), sizeof *head), *flow = head + n + 1;
    assert_non_null(head);
    kent_marcher_profile(m->marcher, span, head, flow);
    const double sum =
        ledger_held(n, ledger_impedance(m->build->model, m->grid, (size_t)span),
                    m->grid->step, head, flow);
    free(head);
    return sum;
}

static void no_water_is_lost_or_made(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "J", 900.0, 0.0, 0.0);
    kent_build_point(&b, "D", 900.0, 350.0, 0.0);
    kent_build_point(&b, "E", 1700.0, 0.0, 0.0);
    kent_build_pipe(&b, "1", "R J", 0.5, 1000.0);
    kent_build_pipe(&b, "2", "J D", 0.2, 1200.0);
    kent_build_pipe(&b, "3", "J E", 0.4, 1100.0);
    kent_build_fixed_level(&b, "R", 60.0);
    const int v = kent_build_valve(&b, "V", "E", 0.05, 0.0);
    const int s = kent_build_scenario(&b, "shut", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.2, 3.0, 0.0);
    b.model->solver.friction = KENT_SURGE_NONE;
    const kent_watch ends[] = {{0, 0.0}, {2, 800.0}};
    march m = march_new(&b, 60.0, 0, ends, 2, 1);
    kent_trace trace;
    kent_error err = {0};
    double net = 0.0, through = 0.0, before = 0.0; /* m3 */
    for (int i = 0; i <= 2000; i++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        if (i == 0) before = held(&m, 0) + held(&m, 1) + held(&m, 2);
        if (i == 0) continue; /* the first step ends at instant 1 */
        net += (trace.flow[0] - trace.flow[1]) * m.grid->step;
        through += fabs(trace.flow[0]) * m.grid->step;
    }
    const double now = held(&m, 0) + held(&m, 1) + held(&m, 2);
    assert_true(through > 0.1);
    assert_true(fabs(now - before) > 1e-4);
    assert_within(now - before, net, 1e-11 * through);
    march_clear(&m);
    kent_build_clear(&b);
}

static void the_envelope_is_the_worst_of_every_instant(void **state)
{
    (void)state;
    enum { SPAN = 3 };
    kent_build b = town(0.0, KENT_SURGE_QUASI_STEADY);
    march m = march_new(&b, 60.0, 0, WATCHES, 1, 1);
    const size_t n = (size_t)m.grid->reaches[SPAN] + 1;
    kent_watch *all = kent_alloc(n, sizeof *all);
    double *mine = kent_alloc(4 * n, sizeof *mine);
    kent_trace trace;
    kent_error err = {0};
    assert_true(all && mine);
    for (size_t i = 0; i < n; i++) {
        all[i] = (kent_watch){SPAN, b.model->spans[SPAN].length * (double)i /
                                        (double)(n - 1)};
        mine[i] = -INFINITY;
        mine[n + i] = INFINITY;
    }
    kent_marcher *k = march_marcher(&m, 0, all, n, 50);
    for (int row = 0; row < 20; row++) {
        assert_int_equal(kent_marcher_advance(k, 50, &trace, &err), 50);
        for (size_t i = 0; i < 50 * n; i++) {
            mine[i % n] = fmax(mine[i % n], trace.head[i]);
            mine[n + i % n] = fmin(mine[n + i % n], trace.head[i]);
        }
        kent_marcher_envelope(k, SPAN, mine + 2 * n, mine + 3 * n);
        assert_memory_equal(mine, mine + 2 * n, 2 * n * sizeof *mine);
    }
    assert_true(mine[0] - mine[n] > 1.0); /* m */
    kent_marcher_free(k);
    free(mine);
    free(all);
    march_clear(&m);
    kent_build_clear(&b);
}

static void between_grid_points_both_neighbours_count(void **state)
{
    (void)state;
    kent_build b = town(0.0, KENT_SURGE_CONSTANT);
    march m = march_new(&b, 60.0, 0, WATCHES, 1, 1);
    const double reach = b.model->spans[3].length / m.grid->reaches[3];
    const kent_watch at[] = {{3, 2.0 * reach},
                             {3, 2.3 * reach},
                             {3, 3.0 * reach},
                             {3, 0.0},
                             {3, b.model->spans[3].length}};
    kent_marcher *k = march_marcher(&m, 0, at, 5, 1);
    kent_trace trace;
    kent_error err = {0};
    double head[64], flow[64], apart = 0.0;
    assert_in_range(m.grid->reaches[3], 3, 63);
    for (int i = 0; i < 400; i++) {
        assert_int_equal(kent_marcher_advance(k, 1, &trace, &err), 1);
        kent_marcher_profile(k, 3, head, flow);
        assert_true(trace.head[0] == head[2] && trace.head[2] == head[3]);
        assert_true(trace.head[3] == head[0] &&
                    trace.head[4] == head[m.grid->reaches[3]]);
        assert_close(trace.flow[4], flow[m.grid->reaches[3]], 1e-14);
        assert_within(trace.head[1], 0.7 * head[2] + 0.3 * head[3], 1e-11);
        assert_within(trace.flow[1], 0.7 * flow[2] + 0.3 * flow[3], 1e-14);
        apart = fmax(apart, fabs(head[2] - head[3]));
    }
    assert_true(apart > 0.5); /* m */
    kent_marcher_free(k);
    march_clear(&m);
    kent_build_clear(&b);
}

/* Of a lumped reach, whatever wave speed it got: over a step, the mean difference of
 * head is L/(g A) times the change of mean flow over the step's time (7.21). */
static void a_short_span_keeps_its_inertia(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "J", 2000.0, 0.0, 0.0);
    kent_build_point(&b, "E", 2005.0, 0.0, 0.0);
    kent_build_pipe(&b, "1", "R J", 0.5, 1000.0);
    kent_build_pipe(&b, "2", "J E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 60.0);
    const int v = kent_build_valve(&b, "V", "E", 0.05, 0.0);
    const int s = kent_build_scenario(&b, "shut", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.0, 10.0, 0.0);
    b.model->solver.friction = KENT_SURGE_NONE;
    const kent_watch ends[] = {{1, 0.0}, {1, 5.0}};
    march m = march_new(&b, 60.0, 0, ends, 2, 1);
    kent_trace trace;
    kent_error err = {0};
    double drop = 0.0, flow = 0.0, largest = 0.0;
    const double inertia = 5.0 / (b.model->gravity * b.model->spans[1].area);
    assert_int_equal(m.grid->reaches[1], 1);
    assert_true(m.grid->misses[1]);
    for (int i = 0; i < 200; i++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        const double drop_now = trace.head[0] - trace.head[1];
        const double flow_now = 0.5 * (trace.flow[0] + trace.flow[1]);
        if (i > 0) {
            assert_within(0.5 * (drop + drop_now),
                          inertia * (flow_now - flow) / m.grid->step, 1e-10);
        }
        largest = fmax(largest, fabs(drop_now));
        drop = drop_now;
        flow = flow_now;
    }
    assert_true(largest > 0.01); /* m */
    march_clear(&m);
    kent_build_clear(&b);
}

/* The highest head at a valve shut in 3 s, behind `stub` m of pipe at the end of 4 km;
 * 0: none. */
static double highest_behind(double stub)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "J", 4000.0, 0.0, 0.0);
    kent_build_point(&b, "E", 4000.0 + stub, 0.0, 0.0);
    kent_build_pipe(&b, "1", "R J", 0.3, 1000.0);
    if (stub > 0.0) kent_build_pipe(&b, "2", "J E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 60.0);
    const int v = kent_build_valve(&b, "V", stub > 0.0 ? "E" : "J", 0.02, 0.0);
    const int s = kent_build_scenario(&b, "shut", 20.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.5, 3.0, 0.0);
    b.model->solver.friction = KENT_SURGE_NONE;
    const kent_watch end = stub > 0.0 ? (kent_watch){1, stub} : (kent_watch){0, 4000.0};
    march m = march_new(&b, 20.0, 0, &end, 1, 1);
    kent_trace trace;
    kent_error err = {0};
    double highest = 0.0; /* m */
    while (kent_marcher_advance(m.marcher, 1, &trace, &err) == 1 &&
           trace.time[0] < 15.0) {
        highest = fmax(highest, trace.head[0]);
    }
    march_clear(&m);
    kent_build_clear(&b);
    return highest;
}

static void a_stub_leaves_the_surge_what_it_was(void **state)
{
    (void)state;
    const double alone = highest_behind(0.0), rise = alone - 60.0; /* m */
    assert_true(rise > 100.0);
    assert_within(highest_behind(10.0), alone, 0.01 * rise);
    assert_within(highest_behind(1.0), alone, 0.01 * rise);
    assert_within(highest_behind(0.1), alone, 0.01 * rise);
}

static void a_valve_follows_its_opening_law(void **state)
{
    (void)state;
    static const kent_law_point law[] = {
        {0.0, 1.0}, {2.0, 0.25}, {4.0, 0.5}, {9.0, 0.1}};
    kent_build b = town(0.0, KENT_SURGE_QUASI_STEADY);
    const int s = kent_build_scenario(&b, "law", 60.0);
    kent_build_law(&b, s, KENT_EVENT_VALVE, 1, 1.0, law, 4);
    const kent_watch at = {6, sqrt(500.0 * 500.0 + 50.0 * 50.0 + 25.0)}; /* D E, at E */
    march m = march_new(&b, 60.0, s, &at, 1, 1);
    kent_trace trace;
    kent_error err = {0};
    do {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        const double t = trace.time[0] - 1.0;
        double opening = 1.0;
        if (t > 0.0) opening = 1.0 - 0.375 * t;
        if (t > 2.0) opening = 0.25 + 0.125 * (t - 2.0);
        if (t > 4.0) opening = 0.5 - 0.08 * (t - 4.0);
        if (t > 9.0) opening = 0.1;
        const double q = 0.02 * opening * sqrt(fabs(trace.head[0]));
        assert_within(trace.flow[0], copysign(q, trace.head[0]), 1e-12);
    } while (trace.time[0] < 12.0);
    march_clear(&m);
    kent_build_clear(&b);
}

/* One reach of a pipe with great losses, behind a closed valve. loss: K. */
static march rough_main(kent_build *b, double loss, double opening)
{
    const kent_watch at = {0, 1000.0};
    *b = kent_build_new();
    kent_build_point(b, "R", 0.0, 0.0, 0.0);
    kent_build_point(b, "E", 1000.0, 0.0, 0.0);
    const int p = kent_build_pipe(b, "main", "R E", 0.5, 1000.0);
    b->model->pipes[p].loss = loss;
    kent_build_fixed_level(b, "R", 400.0);
    const int v = kent_build_valve(b, "V", "E", 2.0, 0.0);
    b->model->valves[v].opening = opening;
    const int s = kent_build_scenario(b, "open", 60.0);
    kent_build_ramp(b, s, KENT_EVENT_VALVE, v, 1.0, 5.0, 1.0);
    b->model->solver.friction = KENT_SURGE_CONSTANT;
    b->model->solver.time_step = 1.0;
    return march_new(b, 60.0, 0, &at, 1, 100);
}

static void beyond_the_stability_limit_the_march_stops_and_says_where(void **state)
{
    (void)state;
    kent_build b;
    march m = rough_main(&b, 450.0, 0.0);
    kent_trace trace;
    kent_error err = {0}, again = {0};
    const size_t count = kent_marcher_advance(m.marcher, 100, &trace, &err);
    assert_in_range(count, 2, 20);
    assert_int_equal(trace.count, count);
    assert_int_equal(err.status, KENT_E_SOLVE);
    assert_non_null(strstr(err.what, "span main at "));
    assert_non_null(strstr(err.what, "it needs at least 2 reaches"));
    assert_int_equal(kent_marcher_advance(m.marcher, 100, &trace, &again), 0);
    assert_string_equal(again.what, err.what);
    for (size_t i = 0; i < trace.count; i++) {
        assert_true(isfinite(trace.head[i]));
    }
    march_clear(&m);
    kent_build_clear(&b);
}

static void a_head_that_is_no_number_stops_the_march(void **state)
{
    (void)state;
    kent_build b;
    march m = rough_main(&b, 450.0, 0.0);
    kent_trace trace;
    kent_error err = {0};
    m.steady->node_head[1] = NAN;
    kent_marcher *k = march_marcher(&m, 0, WATCHES, 1, 100);
    (void)kent_marcher_advance(k, 100, &trace, &err);
    assert_int_equal(err.status, KENT_E_SOLVE);
    assert_non_null(strstr(err.what, "no finite head"));
    kent_marcher_free(k);
    march_clear(&m);
    kent_build_clear(&b);
}

static void a_stiff_span_is_swept_implicitly_and_keeps_its_steady_state(void **state)
{
    (void)state;
    kent_build b;
    march m = rough_main(&b, 450.0, 0.025);
    const double v = m.steady->span_flow[0] / b.model->spans[0].area;
    const double share = 450.0 * v / (2.0 * 1000.0); /* R|Q|/B = K V/(2 a) */
    assert_true(share > 0.5 && share < 0.9); /* no explicit sweep would bear it */
    kent_marcher *k = march_marcher(&m, -1, WATCHES, 1, 100);
    run(k, 20000, 100);
    assert_within(largest_swing(&m, k), 0.0, 1e-9);
    kent_marcher_free(k);
    run(m.marcher, 2000, 100); /* and opening the valve does not upset it */
    double head[2], flow[2];
    kent_marcher_profile(m.marcher, 0, head, flow);
    assert_close(flow[0], flow[1], 1e-9);
    assert_true(flow[0] >= m.steady->span_flow[0]);
    march_clear(&m);
    kent_build_clear(&b);
}

static void a_reach_too_stiff_for_either_is_refused(void **state)
{
    (void)state;
    kent_build b;
    march m = rough_main(&b, 450.0, 0.0);
    kent_marcher *k = NULL;
    kent_error err = {0};
    m.steady->span_flow[0] = 5.0 * b.model->spans[0].area; /* 5 m/s: R|Q|/B = 1.1 */
    assert_int_equal(
        kent_marcher_new(b.model, m.steady, m.grid, 0, WATCHES, 1, 1, &k, &err),
        KENT_E_INPUT);
    assert_string_equal(err.what,
                        "span main: friction takes 1.1 of the wave in one reach "
                        "(R|Q|/B); it needs at least 5 reaches: raise min_reaches or "
                        "shorten time_step");
    march_clear(&m);
    kent_build_clear(&b);
}

static void watches_off_their_span_are_refused(void **state)
{
    (void)state;
    static const kent_watch bad[] = {{8, 0.0}, {-1, 0.0}, {0, 601.5}, {0, -1.0}};
    kent_build b = town(0.0, KENT_SURGE_CONSTANT);
    march m = march_new(&b, 60.0, 0, WATCHES, 1, 1);
    for (int i = 0; i < 4; i++) {
        kent_marcher *k = NULL;
        kent_error err = {0};
        const bool wrong_span = bad[i].span == 8;
        const kent_watch w = {wrong_span ? (int)b.model->span_count : bad[i].span,
                              bad[i].chainage};
        assert_int_equal(
            kent_marcher_new(b.model, m.steady, m.grid, 0, &w, 1, 1, &k, &err),
            KENT_E_INPUT);
        assert_null(k);
    }
    march_clear(&m);
    kent_build_clear(&b);
}

static void a_block_of_no_instants_is_refused(void **state)
{
    (void)state;
    static const size_t bad[] = {0, 1025};
    kent_build b = town(0.0, KENT_SURGE_CONSTANT);
    march m = march_new(&b, 60.0, 0, WATCHES, 1, 1);
    for (int i = 0; i < 2; i++) {
        kent_marcher *k = NULL;
        kent_error err = {0};
        assert_int_equal(kent_marcher_new(b.model, m.steady, m.grid, 0, WATCHES, 1,
                                          bad[i], &k, &err),
                         KENT_E_INPUT);
        assert_non_null(strstr(err.what, "instants; 1 .. 1024"));
    }
    march_clear(&m);
    kent_build_clear(&b);
}

/* A crest near the level: closing the valve upstream of it pulls its head down. */
/* At rest, a metre higher at each node. Water of 1000 kg/m3 that boils at 1705.7 Pa
 * under 101325 Pa does so (101325 - 1705.7)/(1000 x 9.80665) = 10.158 m above its head.
 */
static void the_vapour_limit_is_met_to_the_centimetre(void **state)
{
    (void)state;
    static const struct {
        double head; /* m */
        size_t below;
    } rows[] = {{3.85, 6},
                {3.83, 7}}; /* nodes above 14.008 m and 13.988 m of 0 .. 20 */
    for (size_t i = 0; i < 2; i++) {
        kent_build b = kent_build_new();
        bool touched[2] = {false};
        b.model->water.vapour_pressure = 1705.7;
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "D", 1000.0, 0.0, 20.0);
        kent_build_pipe(&b, "main", "R D", 0.5, 1000.0);
        kent_build_fixed_level(&b, "R", rows[i].head);
        b.model->solver.min_reaches = 20;
        march m = march_new(&b, 20.0, -1, WATCHES, 1, 1);
        assert_int_equal(m.grid->reaches[0], 20);
        assert_int_equal(kent_marcher_below_vapour(m.marcher, touched), rows[i].below);
        assert_true(touched[1]);
        march_clear(&m);
        kent_build_clear(&b);
    }
}

static void heads_below_the_vapour_limit_are_counted_and_placed(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "W", 100.0, 0.0, 0.0);
    kent_build_point(&b, "C", 1000.0, 0.0, 48.0);
    kent_build_point(&b, "L", 1600.0, 0.0, -30.0);
    kent_build_point(&b, "E", 2400.0, 0.0, -30.0);
    const int p = kent_build_pipe(&b, "main", "R W C L E", 0.5, 1000.0);
    b.model->pipes[p].loss = 5.0;
    kent_build_fixed_level(&b, "R", 60.0);
    const int v = kent_build_valve(&b, "V", "W", 0.3, (double)NAN);
    kent_build_valve(&b, "O", "E", 0.015, 0.0);
    const int s = kent_build_scenario(&b, "shut", 20.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.5, 0.5, 0.0);
    march m = march_new(&b, 20.0, 0, WATCHES, 1, 1);
    bool touched[5] = {false};
    assert_int_equal(kent_marcher_below_vapour(m.marcher, touched), 0);
    run(m.marcher, (size_t)(1.6 / m.grid->step), 1); /* the wave has just passed C */
    const size_t count = kent_marcher_below_vapour(m.marcher, touched);
    assert_true(count > 0 && count < m.grid->node_total);
    assert_true(touched[2]);                /* C, the crest */
    assert_false(touched[0] || touched[4]); /* R, E: far from it */
    march_clear(&m);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(without_an_event_nothing_changes),
        cmocka_unit_test(a_flow_of_any_reynolds_number_stands_still),
        cmocka_unit_test(the_first_instant_is_the_steady_state),
        cmocka_unit_test(raising_everything_raises_the_heads_and_nothing_else),
        cmocka_unit_test(kernels_and_block_sizes_give_the_same_bits),
        cmocka_unit_test(no_water_is_lost_or_made),
        cmocka_unit_test(the_envelope_is_the_worst_of_every_instant),
        cmocka_unit_test(between_grid_points_both_neighbours_count),
        cmocka_unit_test(a_short_span_keeps_its_inertia),
        cmocka_unit_test(a_stub_leaves_the_surge_what_it_was),
        cmocka_unit_test(a_valve_follows_its_opening_law),
        cmocka_unit_test(beyond_the_stability_limit_the_march_stops_and_says_where),
        cmocka_unit_test(a_head_that_is_no_number_stops_the_march),
        cmocka_unit_test(a_stiff_span_is_swept_implicitly_and_keeps_its_steady_state),
        cmocka_unit_test(a_reach_too_stiff_for_either_is_refused),
        cmocka_unit_test(watches_off_their_span_are_refused),
        cmocka_unit_test(a_block_of_no_instants_is_refused),
        cmocka_unit_test(the_vapour_limit_is_met_to_the_centimetre),
        cmocka_unit_test(heads_below_the_vapour_limit_are_counted_and_placed),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
