/* Column separation in the march. */
#include "kent_cavities_internal.h"
#include "kent_drag_internal.h"
#include "march.h"

#include <math.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;

/* A level - one frictionless pipe - a valve that shuts at once. */
typedef struct line {
    double length, wave_speed, speed, level; /* m, m/s, m/s, m */
    double limit;                            /* m: the vapour limit at level nil */
    double bore;                             /* m */
    double friction;                         /* Darcy's factor; 0: none */
    double end;                              /* m: level of the valve */
    bool single; /* the water may part at the valve alone: all else lies 60 m deeper */
    bool backwards; /* the pipe runs from the valve to the level */
    int reaches;
    kent_separation separation;
} line;

static kent_build line_build(const line *l, double duration)
{
    kent_build b = kent_build_new();
    kent_model *m = b.model;
    m->gravity = 9.81;
    m->water.density = 1000.0;
    m->water.vapour_pressure = 1700.0;
    m->barometric = m->water.vapour_pressure - l->limit * 9810.0;
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "P", 1e-3 * l->length, 0.0, l->single ? -60.0 : 1e-3 * l->end);
    kent_build_point(&b, "Q", 0.999 * l->length, 0.0,
                     l->single ? -60.0 : 0.999 * l->end);
    kent_build_point(&b, "E", l->length, 0.0, l->end);
    const int p = kent_build_pipe(&b, "A", l->backwards ? "E Q P R" : "R P Q E",
                                  l->bore, l->wave_speed);
    m->pipes[p].length = l->length;
    m->pipes[p].friction = KENT_DARCY_FIXED;
    m->pipes[p].friction_coefficient = l->friction > 0.0 ? l->friction : 1e-9;
    kent_build_fixed_level(&b, "R", l->level + l->speed * l->speed / (2.0 * 9.81));
    const double area = 0.25 * PI * l->bore * l->bore;
    const double loss =
        l->friction * l->length / l->bore * l->speed * l->speed / (2.0 * 9.81);
    const int v = kent_build_valve(
        &b, "V", "E", l->speed * area / sqrt(l->level - loss - l->end), l->end);
    const int s = kent_build_scenario(&b, "shut", duration);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.0, 0.0, 0.0);
    m->solver.friction = l->friction > 0.0 ? KENT_SURGE_CONSTANT : KENT_SURGE_NONE;
    m->solver.time_step = l->length / l->wave_speed / l->reaches;
    m->solver.column_separation = l->separation;
    return b;
}

/* B: derived by hand from the waves of a frictionless line, d = H0 - Hv, J = a V0/g,
 * r = J/d, m = floor(r): open at 2L/a for (2L/a)(m + m (r - m)/(2m + 1 - r)); then
 * Hv + (2m + 1 - r) d, and from (m + 2)(2L/a) on Hv + (2m + 3 - r) d. No source. */
static void first_cavity(const line *l, double opens, double lasts, double after,
                         double pulse, double pulse_at)
{
    kent_build b = line_build(l, 10.0);
    const kent_watch valve = {0, l->length};
    march m = march_new(&b, 10.0, 0, &valve, 1, 1);
    kent_cavity cavity = {0};
    kent_trace trace;
    kent_error err = {0};
    const double later = 0.5 * (opens + lasts + pulse_at) - 0.01 * opens;
    double head = NAN, highest = -INFINITY, when = NAN;

    do {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        if (fabs(trace.time[0] - later) <= 0.5 * m.grid->step) {
            head = trace.head[0];
            assert_int_equal(kent_marcher_cavities(m.marcher, &cavity, 1), 1);
        }
        if (trace.head[0] > highest + 0.01) {
            highest = trace.head[0];
            when = trace.time[0];
        }
    } while (trace.time[0] < 1.02 * pulse_at);
    assert_close(cavity.opened, opens, 0.005);
    assert_close(cavity.collapsed - cavity.opened, lasts, 0.005);
    assert_int_equal(cavity.node, b.model->spans[0].node[1]);
    assert_int_equal(cavity.count, 1);
    assert_close(head, after, 0.02);
    assert_close(cavity.pulse, after - l->limit, 0.02);
    assert_close(highest, pulse, 0.02);
    assert_close(when, pulse_at, 0.005);
    march_clear(&m);
    kent_build_clear(&b);
}

static const line B31 = {.length = 1000.0,
                         .wave_speed = 1000.0,
                         .speed = 0.5,
                         .level = 20.0,
                         .limit = -10.0,
                         .bore = 0.5,
                         .single = true,
                         .reaches = 400,
                         .separation = KENT_SEPARATION_VAPOUR};
static const line B32 = {.length = 37.23,
                         .wave_speed = 1319.0,
                         .speed = 0.30,
                         .level = 22.0,
                         .limit = -10.25,
                         .bore = 0.0221,
                         .single = true,
                         .reaches = 400,
                         .separation = KENT_SEPARATION_VAPOUR};

static void the_first_cavity_at_a_shut_valve_is_that_of_the_waves(void **state)
{
    (void)state;
    for (int gas = 0; gas < 2; gas++) {
        line a = B31, c = B32;
        a.separation = c.separation =
            gas ? KENT_SEPARATION_GAS : KENT_SEPARATION_VAPOUR;
        first_cavity(&a, 2.0, 3.07443, 29.032, 89.032, 6.0);
        first_cavity(&c, 0.05645, 0.06454, 46.16, 110.66, 0.1694);
    }
}

/* The same over what the speed may be, by the formulas themselves: heights J/d between
 * whole numbers, at which two events fall together. */
static void a_cavity_lasts_as_long_as_the_speed_asks(void **state)
{
    (void)state;
    static const double ratio[] = {1.2, 1.5, 1.8, 2.2, 2.5, 2.8, 3.2, 3.5, 3.9};
    for (size_t i = 0; i < 2 * sizeof ratio / sizeof ratio[0]; i++) {
        line l = B31;
        const double r = ratio[i / 2], d = l.level - l.limit, m = floor(r);
        const double period = 2.0 * l.length / l.wave_speed;
        l.speed = r * d * 9.81 / l.wave_speed;
        l.separation = i % 2 ? KENT_SEPARATION_GAS : KENT_SEPARATION_VAPOUR;
        first_cavity(&l, period, period * (m + m * (r - m) / (2.0 * m + 1.0 - r)),
                     l.limit + (2.0 * m + 1.0 - r) * d,
                     l.limit + (2.0 * m + 3.0 - r) * d, period * (m + 2.0));
    }
}

/* ---- what is kept ---------------------------------------------------------------- */

enum { MOST = 2048 };

/* One instant of a span: what the waves that leave its grid points are. */
typedef struct instant {
    size_t reaches;
    double step, impedance; /* s, s/m2 */
    double head[MOST], flow[MOST], hollow[MOST], grown[MOST];
} instant;

static void take(const march *m, int span, instant *at)
{
    double before[MOST] = {0.0};
    at->reaches = (size_t)m->grid->reaches[span];
    assert_true(at->reaches < MOST);
    at->step = m->grid->step;
    at->impedance = m->grid->wave_speed_used[span] /
                    (m->build->model->gravity * m->build->model->spans[span].area);
    for (size_t i = 0; i <= at->reaches; i++) {
        before[i] = at->hollow[i];
    }
    kent_marcher_profile(m->marcher, span, at->head, at->flow);
    kent_marcher_hollow(m->marcher, span, at->hollow);
    for (size_t i = 0; i <= at->reaches; i++) {
        at->grown[i] = at->hollow[i] - before[i];
    }
}

/* m: the wave that leaves a grid point, to the right or the left. Where a cavity grew,
 * as much more has flown out than in. */
static double leaving(const instant *at, size_t i, bool right)
{
    const bool inside = i > 0 && i < at->reaches;
    const double half = inside ? 0.5 * at->grown[i] / at->step : 0.0; /* m3/s */
    const double flow = right ? at->flow[i] + half : -(at->flow[i] - half);
    return at->head[i] + at->impedance * flow;
}

/* m3 held by elasticity: 7.20. */
static double held(const instant *at)
{
    double sum = 0.0;
    for (size_t i = 0; i < at->reaches; i++) {
        sum += leaving(at, i, true) + leaving(at, i + 1, false);
    }
    return 0.5 * sum * at->step / at->impedance;
}

static double inner_hollow(const instant *at)
{
    double sum = 0.0;
    for (size_t i = 1; i < at->reaches; i++) {
        sum += at->hollow[i];
    }
    return sum;
}

/* Vapour opens and closes everywhere in this line. What is hollow is what flowed out
 * of the water's own room, at every instant (15.11). */
static void a_cavity_holds_what_flowed_out(void **state)
{
    (void)state;
    line l = B32;
    l.single = false;
    l.reaches = 64;
    l.level = 12.0;
    kent_build b = line_build(&l, 10.0);
    const kent_watch ends[] = {{0, 0.0}, {0, l.length}};
    march m = march_new(&b, 10.0, 0, ends, 2, 1);
    kent_trace trace;
    kent_error err = {0};
    instant *at = kent_alloc(1, sizeof *at);
    double net = 0.0, through = 0.0, before = 0.0, most = 0.0, valve = 0.0; /* m3 */

    assert_non_null(at);
    for (int i = 0; i <= 4000; i++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        take(&m, 0, at);
        if (i == 0) {
            before = held(at);
            continue;
        }
        net += (trace.flow[0] - trace.flow[1]) * at->step;
        valve += -trace.flow[1] * at->step; /* shut: out of its cavity alone */
        through += fabs(trace.flow[0]) * at->step;
        most = fmax(most, inner_hollow(at));
        assert_within(held(at) - inner_hollow(at) - before, net, 1e-9 * through);
        assert_within(at->hollow[at->reaches], valve, 1e-9 * through);
    }
    assert_true(most > 1e-8);
    free(at);
    march_clear(&m);
    kent_build_clear(&b);
}

/* The same with gas where one block is awake all the time: the profile's first metre is
 * as high as the level. */
static void gas_holds_what_flowed_out(void **state)
{
    (void)state;
    line l = B32;
    l.single = false;
    l.reaches = 48; /* one block */
    l.level = 12.0;
    l.separation = KENT_SEPARATION_GAS;
    kent_build b = line_build(&l, 10.0);
    b.model->points[0].at.z = 20.0; /* its limit is 9.75 m: always within 7.5 m of it */
    const kent_watch ends[] = {{0, 0.0}, {0, l.length}};
    march m = march_new(&b, 10.0, 0, ends, 2, 1);
    kent_trace trace;
    kent_error err = {0};
    instant *at = kent_alloc(1, sizeof *at);
    double net = 0.0, through = 0.0, before = 0.0, most = 0.0; /* m3 */

    assert_non_null(at);
    for (int i = 0; i <= 4000; i++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        take(&m, 0, at);
        if (i == 0) {
            for (size_t n = 0; n <= at->reaches; n++) {
                at->grown[n] = 0.0; /* at t = 0 there was no step */
            }
            before = held(at) - inner_hollow(at);
            continue;
        }
        net += (trace.flow[0] - trace.flow[1]) * at->step;
        through += fabs(trace.flow[0]) * at->step;
        most = fmax(most, inner_hollow(at));
        assert_within(held(at) - inner_hollow(at) - before, net, 1e-9 * through);
    }
    assert_true(most > 1e-8);
    free(at);
    march_clear(&m);
    kent_build_clear(&b);
}

/* A frictionless line shut in at both ends: what its waves carry, reckoned from the
 * vapour limit, never grows, and falls when cavities close (15.13). */
static void no_cavity_makes_energy(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_model *model = b.model;
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "U", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 900.0, 0.0, 0.0);
    kent_build_pipe(&b, "1", "R U", 0.3, 1000.0);
    kent_build_pipe(&b, "2", "U E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 30.0);
    const int u = kent_build_valve(&b, "U", "U", 0.5, (double)NAN);
    const int v = kent_build_valve(&b, "V", "E", 0.05, 0.0);
    const int s = kent_build_scenario(&b, "shut", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, u, 0.5, 0.0, 0.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.5, 0.0, 0.0);
    model->solver.friction = KENT_SURGE_NONE;
    model->solver.time_step = 0.01;
    model->solver.column_separation = KENT_SEPARATION_VAPOUR;
    const kent_watch watch = {1, 0.0};
    march m = march_new(&b, 60.0, 0, &watch, 1, 1);
    const double limit =
        kent_vapour_head(&model->water, 0.0, model->barometric, model->gravity);
    kent_trace trace;
    kent_error err = {0};
    instant *at = kent_alloc(1, sizeof *at);
    double first = 0.0, last = INFINITY;

    assert_non_null(at);
    for (int i = 0; i < 5000; i++) {
        double sum = 0.0; /* m2 */
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        take(&m, 1, at);
        if (i < 51) continue; /* shut from instant 50 on */
        for (size_t n = 0; n < at->reaches; n++) {
            const double right = leaving(at, n, true) - limit;
            const double left = leaving(at, n + 1, false) - limit;
            sum += right * right + left * left;
        }
        if (i == 51) first = sum;
        assert_true(sum <= last * (1.0 + 1e-12));
        last = sum;
    }
    kent_cavity cavities[4];
    assert_true(kent_marcher_cavities(m.marcher, cavities, 4) >= 2);
    assert_true(last < 0.999 * first && last > 0.0);
    free(at);
    march_clear(&m);
    kent_build_clear(&b);
}

/* ---- the same whatever ------------------------------------------------------------
 */

/* Parameters of H. Bergant and A. Simpson's rig: see cases/experiments. */
static const line RIG = {.length = 37.23,
                         .wave_speed = 1319.0,
                         .speed = 0.30,
                         .level = 22.0,
                         .limit = -10.15,
                         .bore = 0.0221,
                         .friction = 0.034,
                         .end = 2.029,
                         .reaches = 150,
                         .separation = KENT_SEPARATION_GAS};

static void a_line_described_backwards_does_the_same(void **state)
{
    (void)state;
    for (int gas = 0; gas < 2; gas++) {
        line l = RIG;
        l.reaches = 63; /* one block, so that it wakes and sleeps alike */
        l.speed = 1.4;  /* so that the water parts inside as well */
        double highest[2][MOST], lowest[2][MOST], head = 0.0, flow = 0.0;
        kent_cavity cavities[2][MOST];
        size_t count[2];
        if (!gas) l.separation = KENT_SEPARATION_VAPOUR;
        for (int turn = 0; turn < 2; turn++) {
            l.backwards = turn == 1;
            kent_build b = line_build(&l, 0.6);
            const kent_watch watch = {0, 0.0};
            march m = march_new(&b, 0.6, 0, &watch, 1, 7);
            march_until(&m, 0.2, &head, &flow);
            kent_marcher_envelope(m.marcher, 0, highest[turn], lowest[turn]);
            count[turn] = kent_marcher_cavities(m.marcher, cavities[turn], MOST);
            march_clear(&m);
            kent_build_clear(&b);
        }
        assert_true(count[0] == count[1] && count[0] > 1);
        for (int i = 0; i <= l.reaches; i++) {
            assert_within(highest[1][l.reaches - i], highest[0][i], 1e-6);
            assert_within(lowest[1][l.reaches - i], lowest[0][i], 1e-6);
        }
        assert_close(cavities[1][0].largest, cavities[0][0].largest, 1e-8);
        assert_true(cavities[0][0].node >= 0 && cavities[1][0].node >= 0);
    }
}

/* Heads at three places, in one number per instant. */
static void march_rows(const line *l, const char *kernel, size_t block, double *rows,
                       size_t count)
{
    kent_build b = line_build(l, 1.0);
    const kent_watch watch[] = {{0, l->length}, {0, 0.37 * l->length}, {0, 3.0}};
    assert_int_equal(setenv("KENTLEDGE_SIMD", kernel, 1), 0);
    march m = march_new(&b, 1.0, 0, watch, 3, block);
    kent_trace trace;
    kent_error err = {0};
    for (size_t at = 0; at < count;) {
        const size_t got = kent_marcher_advance(m.marcher, block, &trace, &err);
        for (size_t n = 0; n < got && at < count; n++, at++) {
            rows[2 * at] = trace.head[3 * n] + trace.head[3 * n + 1];
            rows[2 * at + 1] = trace.flow[3 * n + 1] + trace.flow[3 * n + 2];
        }
    }
    march_clear(&m);
    kent_build_clear(&b);
}

static void kernels_and_blocks_give_the_same_bits(void **state)
{
    (void)state;
    static double want[4000], got[4000];
    line l = RIG;
    l.reaches = 301;
    l.speed = 1.4;
    march_rows(&l, "base", 1, want, 2000);
    const char *wide = "";
    for (int i = 0; i < 3; i++) {
        march_rows(&l, wide, i == 0 ? 1 : 37U * (unsigned)i, got, 2000);
        for (size_t n = 0; n < 4000; n++) {
            assert_true(got[n] == want[n]);
        }
        if (i == 0) wide = "base";
        if (i == 1) wide = "";
    }
    assert_int_equal(unsetenv("KENTLEDGE_SIMD"), 0);
}

/* ---- against the textbook program --------------------------------------------------
 */

/* The discrete gas cavity model by heads and flows, every node all the time, each head
 * found by halving brackets: E. B. Wylie, "Simulation of vaporous and gaseous
 * cavitation", Journal of Fluids Engineering 106, 1984; E. B. Wylie and V. L. Streeter,
 * Fluid Transients in Systems, 1993, chapter 8 (both from memory). The rig of 16
 * reaches, computed apart from this program. */
static const struct {
    int step;
    double head, hollow; /* m, m3: at the valve */
    double middle;       /* m: head half way */
} TEXTBOOK[] = {
    {1, 62.0718906384, 6.56707482e-12, 21.8686309104},
    {16, 62.1885998080, 6.55617392e-12, 62.1885998499},
    {33, -8.1114523154, 4.82799741e-08, 22.1352495047},
    {40, -8.1197791643, 3.77579034e-07, 22.1350932209},
    {64, -8.1207032546, 1.55339234e-06, 22.1098389492},
    {70, -8.1140299527, 6.61346972e-08, 22.2054014344},
    {80, 42.5018422649, 9.10580963e-12, 42.4969267368},
    {100, 101.3285728780, 4.21163786e-12, 21.7708855728},
    {150, 41.0316908052, 9.37816337e-12, -7.8187169908},
    {200, 3.0712773441, 4.11857167e-11, 1.2193134867},
    {280, 57.8559140102, 6.98671605e-12, 28.9938231407},
};

/* The march's own steps with heights of the test's own. */
typedef struct bare {
    const kent_kernel *kernel;
    kent_drag *drag;
    kent_waves *waves;
    kent_ends *ends;
    kent_schedule *schedule;
    kent_cavities *cavities;
} bare;

static bare bare_new(const march *m, kent_cavity_heights heights)
{
    bare k = {0};
    kent_error err = {0};
    const kent_model *model = m->build->model;
    const double head[2] = {m->steady->node_head[model->spans[0].node[0]],
                            m->steady->node_head[model->spans[0].node[1]]};
    assert_int_equal(kent_kernel_pick(NULL, &k.kernel, &err), KENT_OK);
    assert_int_equal(kent_drag_new(model, m->steady, m->grid, &k.drag, &err), KENT_OK);
    assert_int_equal(kent_waves_new(model, m->grid, k.drag->implicit, &k.waves, &err),
                     KENT_OK);
    assert_int_equal(kent_ends_new(model, m->steady, k.waves, 0, &k.ends, &err),
                     KENT_OK);
    assert_int_equal(kent_schedule_new(model, 0, &k.schedule, &err), KENT_OK);
    kent_waves_set(k.waves, 0, head, m->steady->span_flow[0]);
    kent_drag_start(k.drag, model, m->steady, k.waves);
    assert_int_equal(kent_cavities_new(model, m->grid->step, heights, k.waves, k.ends,
                                       &k.cavities, &err),
                     KENT_OK);
    return k;
}

static void bare_step(const bare *k, double time, double step)
{
    assert_true(kent_cavities_sweep(k->cavities, k->drag, k->waves) == 0);
    assert_true(kent_waves_sweep(k->waves, k->kernel) == 0);
    kent_waves_move(k->waves);
    kent_ends_move(k->ends, k->schedule, time, step);
    kent_ends_solve(k->ends, k->waves);
    kent_cavities_solve(k->cavities, k->waves, time);
}

static void bare_clear(bare *k)
{
    kent_cavities_free(k->cavities);
    kent_schedule_free(k->schedule);
    kent_ends_free(k->ends);
    kent_waves_free(k->waves);
    kent_drag_free(k->drag);
}

static void gas_agrees_with_the_published_model(void **state)
{
    (void)state;
    line l = RIG;
    l.reaches = 16;
    kent_build b = line_build(&l, 0.6);
    march m = march_new(&b, 0.6, 0, NULL, 0, 1);
    bare k = bare_new(&m, (kent_cavity_heights){1e9, 2e9}); /* nothing sleeps */
    int n = 0;
    for (size_t i = 0; i < sizeof TEXTBOOK / sizeof TEXTBOOK[0]; i++) {
        for (; n < TEXTBOOK[i].step; n++) {
            bare_step(&k, (n + 1) * m.grid->step, m.grid->step);
        }
        const double valve = kent_cavities_head(k.cavities, k.waves, 16);
        const double middle = kent_cavities_head(k.cavities, k.waves, 8);
        const int node = b.model->spans[0].node[1];
        assert_within(valve, TEXTBOOK[i].head, 1e-8);
        assert_close(kent_cavities_at_node(k.cavities, node), TEXTBOOK[i].hollow, 1e-8);
        assert_within(middle, TEXTBOOK[i].middle, 1e-8);
    }
    bare_clear(&k);
    march_clear(&m);
    kent_build_clear(&b);
}

/* 15.9: what sleeping gas can change at once. */
static double most_from_sleep(const line *l)
{
    return KENT_CAVITY_GAS * 101325.0 / 9810.0 * l->wave_speed * l->wave_speed /
           (2.0 * 9.81 * KENT_CAVITY_HEIGHTS.wakes);
}

/* The same main awake all the time and as it is marched: until the first cavity closes
 * they are no further apart than 15.9, and the peak that follows by hardly more. */
static void sleep_changes_next_to_nothing(void **state)
{
    (void)state;
    line l = RIG;
    l.reaches = 150;
    kent_build b = line_build(&l, 0.6);
    march m = march_new(&b, 0.6, 0, NULL, 0, 1);
    bare awake = bare_new(&m, (kent_cavity_heights){1e9, 2e9});
    bare asleep = bare_new(&m, KENT_CAVITY_HEIGHTS);
    const double most = most_from_sleep(&l);
    double peak[2] = {0.0, 0.0}, gap = 0.0;
    size_t woke = 0;
    for (int n = 1; n * m.grid->step < 0.3; n++) {
        bare_step(&awake, n * m.grid->step, m.grid->step);
        bare_step(&asleep, n * m.grid->step, m.grid->step);
        const double a = kent_cavities_head(awake.cavities, awake.waves, 150);
        const double c = kent_cavities_head(asleep.cavities, asleep.waves, 150);
        if (n * m.grid->step < 0.12) gap = fmax(gap, fabs(a - c));
        peak[0] = fmax(peak[0], a);
        peak[1] = fmax(peak[1], c);
        if (asleep.cavities->awake_blocks > woke) woke = asleep.cavities->awake_blocks;
    }
    assert_true(gap > 0.0 && gap < most);
    assert_close(peak[1], peak[0], 5e-4);
    assert_true(woke > 0 &&
                asleep.cavities->awake_blocks < awake.cavities->awake_blocks);
    bare_clear(&awake);
    bare_clear(&asleep);
    march_clear(&m);
    kent_build_clear(&b);
}

/* ---- where they open ----------------------------------------------------------------
 */

/* A main over a high point between two levels, with a valve near its upper end that
 * shuts: what lies beyond runs on and parts at the knee. */
static kent_build hill(kent_separation separation, double top, int *valve)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 60.0);
    kent_build_point(&b, "U", 50.0, 0.0, 20.0);
    kent_build_point(&b, "L", 600.0, 0.0, 5.0);
    kent_build_point(&b, "K", 1200.0, 0.0, top);
    kent_build_point(&b, "S", 2000.0, 0.0, 30.0);
    kent_build_pipe(&b, "1", "R U", 0.4, 1000.0);
    kent_build_pipe(&b, "2", "U L K S", 0.4, 1000.0);
    for (int i = 0; i < 2; i++) {
        b.model->pipes[i].friction = KENT_DARCY_FIXED;
        b.model->pipes[i].friction_coefficient = 0.018;
    }
    kent_build_fixed_level(&b, "R", 80.0);
    kent_build_fixed_level(&b, "S", 55.0);
    *valve = kent_build_valve(&b, "V", "U", 0.5, (double)NAN);
    const int s = kent_build_scenario(&b, "shut", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, *valve, 1.0, 4.0, 0.0);
    b.model->solver.friction = KENT_SURGE_QUASI_STEADY;
    b.model->solver.time_step = 0.01;
    b.model->solver.column_separation = separation;
    return b;
}

static void the_water_parts_at_the_knee(void **state)
{
    (void)state;
    for (int gas = 0; gas < 2; gas++) {
        int valve = 0;
        kent_build b =
            hill(gas ? KENT_SEPARATION_GAS : KENT_SEPARATION_VAPOUR, 48.0, &valve);
        const kent_watch watch = {1, 0.0};
        march m = march_new(&b, 60.0, 0, &watch, 1, 1);
        kent_cavity cavities[64];
        double head = 0.0, flow = 0.0, highest[MOST], lowest[MOST];
        march_until(&m, 30.0, &head, &flow);
        const size_t count = kent_marcher_cavities(m.marcher, cavities, 64);
        assert_true(count >= 1);
        assert_int_equal(cavities[0].node, -1);
        assert_int_equal(cavities[0].span, 1);
        /* K lies sqrt(550^2 + 15^2) + sqrt(600^2 + 43^2) m from U */
        assert_within(cavities[0].chainage, 550.204 + 601.539, 10.0);
        assert_true(cavities[0].opened > 3.0 && cavities[0].opened < 6.2);
        assert_true(cavities[0].largest > 1e-4 && cavities[0].largest < 5.0);
        assert_true(cavities[0].largest_at > cavities[0].opened &&
                    cavities[0].collapsed > cavities[0].largest_at);
        assert_true(cavities[0].pulse > 1.0);
        kent_marcher_envelope(m.marcher, 1, highest, lowest);
        const kent_span *span = &b.model->spans[1];
        for (int i = 0; i <= m.grid->reaches[1]; i++) {
            const double z =
                kent_span_level(b.model, span, span->length * i / m.grid->reaches[1]);
            const double limit = kent_vapour_head(
                &b.model->water, z, b.model->barometric, b.model->gravity);
            assert_true(lowest[i] >= limit - 1e-9);
        }
        bool touched[8];
        assert_int_equal(kent_marcher_below_vapour(m.marcher, touched), 0);
        march_clear(&m);
        kent_build_clear(&b);
    }
}

/* The knee stands 2 m above the grade line, so it is awake from the start: nothing
 * moves as long as nothing happens. */
static void a_low_main_at_rest_stays_as_it_is(void **state)
{
    (void)state;
    int valve = 0;
    kent_build b = hill(KENT_SEPARATION_GAS, 70.0, &valve);
    const kent_watch watch[] = {{1, 1151.743}, {1, 400.0}};
    march m = march_new(&b, 60.0, -1, watch, 2, 1);
    kent_trace trace;
    kent_error err = {0};
    double first[4] = {0.0};
    assert_true(kent_steady_head(b.model, m.steady, 1, 1151.743) < 70.0 - 5.2);
    for (int i = 0; i < 100000; i++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        for (int w = 0; w < 2; w++) {
            if (i == 0) first[w] = trace.head[w];
            if (i == 0) first[2 + w] = trace.flow[w];
            assert_within(trace.head[w], first[w], 1e-9);
            assert_within(trace.flow[w], first[2 + w], 1e-11);
        }
    }
    march_clear(&m);
    kent_build_clear(&b);
}

/* A shut valve in line parts the water on the side that runs away from it, and an
 * outflow gives nothing while its node is hollow. */
static void ends_of_every_kind_part(void **state)
{
    (void)state;
    for (int kind = 0; kind < 3; kind++) { /* valve, outflow, joint */
        kent_build b = kent_build_new();
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "U", 100.0, 0.0, 0.0);
        kent_build_point(&b, "J", 700.0, 0.0, kind == 2 ? 18.0 : 0.0);
        kent_build_point(&b, "E", 1300.0, 0.0, kind == 2 ? 0.0 : 14.0);
        kent_build_pipe(&b, "1", "R U", 0.3, 1000.0);
        kent_build_pipe(&b, "2", "U J", 0.3, 1000.0);
        kent_build_pipe(&b, "3", "J E", 0.3, 1000.0);
        kent_build_fixed_level(&b, "R", 30.0);
        const int u = kent_build_valve(&b, "U", "U", 0.5, (double)NAN);
        int v = -1;
        if (kind == 1) {
            kent_build_outflow(&b, "E", 0.1);
        } else {
            v = kent_build_valve(&b, "V", "E", 0.025, kind == 2 ? 0.0 : 14.0);
        }
        const int s = kent_build_scenario(&b, "shut", 60.0);
        kent_build_ramp(&b, s, KENT_EVENT_VALVE, u, 0.5, 0.5, 0.0);
        if (kind == 0) kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.5, 8.0, 0.1);
        b.model->solver.friction = KENT_SURGE_NONE;
        b.model->solver.time_step = 0.01;
        b.model->solver.column_separation = KENT_SEPARATION_GAS;
        const kent_watch watch = {2, kind == 2 ? 600.0 : hypot(600.0, 14.0)};
        march m = march_new(&b, 60.0, 0, &watch, 1, 1);
        kent_cavity cavities[64];
        kent_trace trace;
        kent_error err = {0};
        bool at_valve = false, at_end = false;
        const double limit = kent_vapour_head(&b.model->water, 14.0,
                                              b.model->barometric, b.model->gravity);
        for (int i = 0; i < 3000; i++) {
            assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
            if (kind == 1 && trace.head[0] < 14.0) {
                assert_true(trace.head[0] > limit);
            }
        }
        const size_t count = kent_marcher_cavities(m.marcher, cavities, 64);
        assert_true(count > 0);
        for (size_t i = 0; i < (count < 64 ? count : 64); i++) {
            if (cavities[i].node == b.model->spans[1].node[0]) at_valve = true;
            if (cavities[i].node == b.model->spans[2].node[kind == 2 ? 0 : 1]) {
                at_end = true;
            }
            assert_true(i == 0 || cavities[i].largest <= cavities[i - 1].largest);
            assert_true(cavities[i].node != b.model->spans[0].node[0]); /* the level */
        }
        assert_true(at_valve && at_end);
        march_clear(&m);
        kent_build_clear(&b);
    }
}

/* Beside a cavity the flows differ: a watch just before and just after it reads each,
 * and one at it their mean; the head is that of the cavity. */
static void watches_read_either_side_of_a_cavity(void **state)
{
    (void)state;
    int valve = 0;
    kent_build b = hill(KENT_SEPARATION_VAPOUR, 48.0, &valve);
    kent_build_derive(&b);
    march m = march_new(&b, 60.0, 0, NULL, 0, 1);
    const double reach = b.model->spans[1].length / m.grid->reaches[1];
    const double at = reach * floor(1151.743 / reach + 0.5);
    const kent_watch watch[] = {{1, at - 1e-5},
                                {1, at},
                                {1, at + 1e-5},
                                {1, at + 0.5 * reach},
                                {1, at + reach}};
    kent_marcher *k = march_marcher(&m, 0, watch, 5, 1);
    const double z = kent_span_level(b.model, &b.model->spans[1], at);
    const double limit =
        kent_vapour_head(&b.model->water, z, b.model->barometric, b.model->gravity);
    kent_trace trace;
    kent_error err = {0};
    double hollow[MOST], last = 0.0;
    int parted = 0;
    for (int i = 0; i < 1500; i++) {
        assert_int_equal(kent_marcher_advance(k, 1, &trace, &err), 1);
        kent_marcher_hollow(k, 1, hollow);
        const double now = hollow[(size_t)(at / reach + 0.5)];
        if (now > 0.0 && last > 0.0) {
            const double *q = trace.flow;
            assert_within(trace.head[1], limit, 1e-9);
            assert_within(q[2] - q[0], (now - last) / m.grid->step, 1e-5 * fabs(q[2]));
            assert_within(q[1], 0.5 * (q[0] + q[2]), 1e-5 * fabs(q[2]));
            assert_within(trace.head[3], 0.5 * (trace.head[1] + trace.head[4]), 1e-9);
            parted++;
        }
        last = now;
    }
    assert_true(parted > 10);
    kent_marcher_free(k);
    march_clear(&m);
    kent_build_clear(&b);
}

/* B31's line with a tank near the level: what it says of itself while the
 * water is parted elsewhere is what the pipes beside it pass. */
static void devices_tell_while_the_water_is_parted(void **state)
{
    (void)state;
    const line l = B31;
    kent_build b = line_build(&l, 10.0);
    const double slope = hypot(1e-3 * l.length, 60.0); /* m, of R to P and of Q to E */
    const double beside = l.length * slope / (0.998 * l.length + 2.0 * slope);
    const kent_watch watches[] = {{0, beside}, {1, 0.0}};
    kent_trace trace;
    kent_error err = {0};
    kent_cavity cavity = {0};
    double most = 0.0; /* m3/s */
    kent_build_surge_tank(&b, "ST", "P", 0.5);
    march m = march_new(&b, 10.0, 0, watches, 2, 1);

    do {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        const double flow = trace.devices[0].flow;
        assert_within(flow, trace.flow[0] - trace.flow[1], 1e-9);
        if (kent_marcher_cavities(m.marcher, &cavity, 1) == 1 &&
            isnan(cavity.collapsed)) {
            most = fmax(most, fabs(flow));
        }
    } while (trace.time[0] < 4.0);
    assert_true(most > 1e-3);
    march_clear(&m);
    kent_build_clear(&b);
}

/* Finer grids: the first peak after the first collapse settles. */
static void the_grid_hardly_matters(void **state)
{
    (void)state;
    double peak[3] = {0.0}, when[3] = {0.0};
    for (int i = 0; i < 3; i++) {
        line l = RIG;
        l.reaches = 64 << i;
        kent_build b = line_build(&l, 1.0);
        const kent_watch valve = {0, l.length};
        march m = march_new(&b, 1.0, 0, &valve, 1, 1);
        kent_trace trace;
        kent_error err = {0};
        peak[i] = -INFINITY;
        do {
            assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
            if (trace.head[0] > peak[i]) {
                peak[i] = trace.head[0];
                when[i] = trace.time[0];
            }
        } while (trace.time[0] < 0.25);
        march_clear(&m);
        kent_build_clear(&b);
    }
    assert_close(peak[1], peak[0], 0.01);
    assert_close(peak[2], peak[1], 0.005);
    assert_close(when[2], when[1], 0.1);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_first_cavity_at_a_shut_valve_is_that_of_the_waves),
        cmocka_unit_test(a_cavity_lasts_as_long_as_the_speed_asks),
        cmocka_unit_test(a_cavity_holds_what_flowed_out),
        cmocka_unit_test(gas_holds_what_flowed_out),
        cmocka_unit_test(no_cavity_makes_energy),
        cmocka_unit_test(a_line_described_backwards_does_the_same),
        cmocka_unit_test(kernels_and_blocks_give_the_same_bits),
        cmocka_unit_test(gas_agrees_with_the_published_model),
        cmocka_unit_test(sleep_changes_next_to_nothing),
        cmocka_unit_test(the_water_parts_at_the_knee),
        cmocka_unit_test(a_low_main_at_rest_stays_as_it_is),
        cmocka_unit_test(ends_of_every_kind_part),
        cmocka_unit_test(watches_read_either_side_of_a_cavity),
        cmocka_unit_test(devices_tell_while_the_water_is_parted),
        cmocka_unit_test(the_grid_hardly_matters),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
