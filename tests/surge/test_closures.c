/* Valve closures and wave reflections whose answers are known in closed form. */
#include "march.h"

#include <math.h>

static const double G = 9.81; /* m/s2, as in the published answers */

/* Reservoir - frictionless pipe - valve that discharges to nil and closes in a straight
 * line from t = 0. The answers know no velocity head; ours loses V2/2g at the
 * reservoir. Both see only a V0/g and L/a, so wave speed and length are taken 100 times
 * as large and V0 100 times as small: V0^2/2g is then below 1e-5 of H0. */
typedef struct closure {
    kent_build build;
    march march;
    double steady; /* m */
} closure;

static const double A = 1e5; /* m/s, L/a = 1 s */

static void closure_new(closure *c, double h0, double v0, double closing_time)
{
    const kent_watch valve = {0, A};
    c->build = kent_build_new();
    kent_build *b = &c->build;
    b->model->gravity = G;
    kent_build_point(b, "R", 0.0, 0.0, 0.0);
    kent_build_point(b, "E", A, 0.0, 0.0);
    kent_build_pipe(b, "main", "R E", 0.5, A);
    kent_build_fixed_level(b, "R", h0);
    const double area = acos(-1.0) * 0.25 * 0.5 * 0.5; /* m2 */
    const int v = kent_build_valve(b, "V", "E", v0 * area / sqrt(h0), 0.0);
    const int s = kent_build_scenario(b, "shut", 60.0);
    kent_build_ramp(b, s, KENT_EVENT_VALVE, v, 0.0, closing_time, 0.0);
    b->model->solver.time_step = 1.0 / 200.0;
    b->model->solver.friction = KENT_SURGE_NONE;
    c->march = march_new(b, 60.0, 0, &valve, 1, 1);
    c->steady = c->march.steady->node_head[1];
}

static void closure_clear(closure *c)
{
    march_clear(&c->march);
    kent_build_clear(&c->build);
}

/* Head at the valve after k x 2L/a for k = 1, 2, 3 (at[0 .. 2]), and the highest. */
static void close_valve(double h0, double v0, double closing_time, double duration,
                        double at[3], double *highest, double *when)
{
    closure c;
    kent_trace trace;
    kent_error err = {0};
    closure_new(&c, h0, v0, closing_time);
    *highest = 0.0;
    do {
        assert_int_equal(kent_marcher_advance(c.march.marcher, 1, &trace, &err), 1);
        const double t = trace.time[0], head = trace.head[0];
        for (int k = 0; k < 3; k++) {
            if (fabs(t - 2.0 * (k + 1)) < 1e-9) at[k] = head;
        }
        if (head > *highest * (1.0 + 1e-9)) {
            *highest = head;
            *when = t;
        }
    } while (trace.time[0] < duration);
    closure_clear(&c);
}

/* L. Allievi's interlocking equations (Theory of Water-Hammer, 1925), evaluated:
 * rho = a V0/(2 g H0), theta = closing time over 2L/a; heads over H0, times in 2L/a. */
static const struct {
    double rho, theta, highest, when, at[3];
} ALLIEVI[] = {
    {0.5, 1, 2.0, 1.0, {2.0, 0.0, 2.0}},
    {0.5, 2, 1.40693, 1.0, {1.40693, 1.18614, 0.81386}},
    {0.5, 3, 1.25358, 1.0, {1.25358, 1.13735, 1.21813}},
    {0.5, 5, 1.14424, 1.0, {1.14424, 1.08619, 1.11648}},
    {0.5, 10, 1.06933, 1.0, {1.06933, 1.04396, 1.05459}},
    {1, 1, 3.0, 1.0, {3.0, -1.0, 3.0}},
    {1, 2, 1.75189, 1.445, {1.69722, 1.60555, 0.39445}},
    {1, 3, 1.43298, 1.43, {1.41433, 1.38638, 1.39858}},
    {1, 5, 1.23284, 1.417, {1.22739, 1.21985, 1.22138}},
    {1, 10, 1.10771, 1.407, {1.10654, 1.10501, 1.10514}},
    {2, 2, 2.79904, 1.975, {2.10102, 2.79796, -0.79796}},
    {2, 3, 1.95226, 2.465, {1.61311, 1.92422, 1.92533}},
    {4, 2, 5.84441, 2.0, {2.57779, 5.84441, -3.84441}},
    {4, 3, 3.6497, 3.0, {1.81494, 2.86021, 3.6497}},
    {4, 5, 2.19034, 4.62, {1.40741, 1.78042, 2.04652}},
};

static void linear_closures_give_allievis_heads(void **state)
{
    (void)state;
    const double h0 = 100.0; /* m */
    for (size_t i = 0; i < sizeof ALLIEVI / sizeof ALLIEVI[0]; i++) {
        const double v0 = ALLIEVI[i].rho * 2.0 * G * h0 / A;
        double at[3] = {0.0, 0.0, 0.0}, highest = 0.0, when = 0.0;
        print_message("rho %g theta %g\n", ALLIEVI[i].rho, ALLIEVI[i].theta);
        close_valve(h0, v0, 2.0 * ALLIEVI[i].theta, 14.0, at, &highest, &when);
        assert_close(highest / h0, ALLIEVI[i].highest, 1e-3);
        assert_within(when / 2.0, ALLIEVI[i].when, 0.01);
        for (int k = 0; k < 3; k++) {
            assert_within(at[k] / h0, ALLIEVI[i].at[k], 1e-3 * ALLIEVI[i].highest);
        }
    }
}

/* Rise over H0 tends to n/2 + sqrt(n + n^2/4) with n = (rho/theta)^2: for n = 0.04 the
 * head to 1.22100 H0, late in a slow closure. Allievi, 1925; worked out apart. */
static void a_slow_closure_tends_to_the_limit_head(void **state)
{
    (void)state;
    const double h0 = 100.0, rho = 4.0, theta = 20.0;
    double at[3] = {0.0, 0.0, 0.0}, highest = 0.0, when = 0.0;
    close_valve(h0, rho * 2.0 * G * h0 / A, 2.0 * theta, 2.0 * theta, at, &highest,
                &when);
    assert_close(highest / h0, 1.22100, 1e-3);
    assert_true(when > 20.0);
}

/* L 1000 m, a 1000 m/s, V0 1 m/s, H0 100 m: Allievi's equations in SI, worked out apart
 * from the program. */
static void closures_of_a_kilometre_give_the_exact_highest_heads(void **state)
{
    (void)state;
    static const double time[] = {2.0, 4.0, 6.0, 10.0, 20.0};                   /* s */
    static const double want[] = {201.937, 141.342, 125.735, 114.627, 107.026}; /* m */
    for (int i = 0; i < 5; i++) {
        double at[3] = {0.0, 0.0, 0.0}, highest = 0.0, when = 0.0;
        close_valve(100.0, 1000.0 / A, time[i], 8.0, at, &highest, &when);
        assert_close(highest, want[i], 1e-3);
        assert_within(when, 2.0, 1e-9);
    }
}

/* An instant closure raises the head by a V0/g (N. Joukowsky, 1898), to the last
 * digits: the head before and the flow before are known exactly. */
static void an_instant_closure_gives_joukowskys_rise(void **state)
{
    (void)state;
    closure c;
    double head = 0.0, flow = 0.0;
    closure_new(&c, 100.0, 0.01, 0.0);
    march_until(&c.march, 1.0 / 200.0, &head, &flow);
    const double area = c.build.model->spans[0].area;
    const double rise = A * c.march.steady->span_flow[0] / (G * area);
    assert_close(head - c.steady, rise, 1e-11);
    assert_within(flow, 0.0, 1e-15);
    closure_clear(&c);
}

/* ---- reflections ----------------------------------------------------------------- */

/* A wave of 1 m comes along pipe 1 (fed by an outflow that starts to flow inwards) to
 * the junction J with up to two more pipes; 1 s through each. Bores m, speeds m/s. */
static void meet(size_t pipes, const double *bore, const double *speed, double *through,
                 double *back)
{
    kent_build build = kent_build_new(), *b = &build;
    const char *route[] = {"S J", "J P", "J Q"}, *id[] = {"1", "2", "3"};
    const kent_watch watch = {0, speed[0]};
    double head = 0.0, flow = 0.0;

    kent_build_point(b, "S", (double)NAN, (double)NAN, 0.0);
    kent_build_point(b, "J", (double)NAN, (double)NAN, 0.0);
    kent_build_point(b, "P", (double)NAN, (double)NAN, 0.0);
    kent_build_point(b, "Q", (double)NAN, (double)NAN, 0.0);
    for (size_t i = 0; i < pipes; i++) {
        const int p = kent_build_pipe(b, id[i], route[i], bore[i], speed[i]);
        b->model->pipes[p].length = speed[i];
    }
    kent_build_fixed_level(b, "P", 50.0);
    const int o = kent_build_outflow(b, "S", 0.0);
    const int s = kent_build_scenario(b, "start", 10.0);
    kent_build_ramp(b, s, KENT_EVENT_OUTFLOW, o, 0.0, 0.0, 0.0);
    b->model->solver.time_step = 0.125;
    b->model->solver.friction = KENT_SURGE_NONE;
    kent_build_derive(b);
    const double impedance = speed[0] / (b->model->gravity * b->model->spans[0].area);
    b->model->events[0].to = -1.0 / impedance; /* m3/s, raises the head by 1 m */

    march m = march_new(b, 10.0, 0, &watch, 1, 1);
    march_until(&m, 1.5, &head, &flow); /* at J, behind the wave */
    *through = head - 50.0;
    kent_marcher_free(m.marcher);
    const kent_watch near = {0, 0.75 * speed[0]};
    m.marcher = march_marcher(&m, 0, &near, 1, 1);
    march_until(&m, 1.5, &head, &flow); /* behind what J sent back */
    *back = head - 51.0;
    march_clear(&m);
    kent_build_clear(b);
}

/* s = 2 (A1/a1)/sum(A/a) transmitted, r = s - 1 reflected: any text on water hammer
 * (formula from memory). */
static void junctions_split_waves_by_area_over_wave_speed(void **state)
{
    (void)state;
    static const struct {
        size_t pipes;
        double bore[3], speed[3], through, back;
    } want[] = {
        {2, {0.6, 0.3}, {1000.0, 1000.0}, 1.6, 0.6},
        {2, {0.3, 0.6}, {1000.0, 1000.0}, 0.4, -0.6},
        {3, {0.4, 0.4, 0.4}, {1000.0, 1000.0, 1000.0}, 2.0 / 3.0, -1.0 / 3.0},
        {2, {0.5, 0.5}, {1200.0, 400.0}, 0.5, -0.5},
    };
    for (size_t i = 0; i < sizeof want / sizeof want[0]; i++) {
        double through = 0.0, back = 0.0;
        meet(want[i].pipes, want[i].bore, want[i].speed, &through, &back);
        assert_within(through, want[i].through, 1e-9);
        assert_within(back, want[i].back, 1e-9);
    }
}

/* Main 0.5 m at 1100 m/s with a branch of 0.3 m at 1200 m/s; six digits published. */
static void a_branch_takes_its_share_of_a_wave(void **state)
{
    (void)state;
    static const double bore[] = {0.5, 0.5, 0.3}, speed[] = {1100.0, 1100.0, 1200.0};
    double through = 0.0, back = 0.0;
    meet(3, bore, speed, &through, &back);
    assert_within(through, 0.858369, 5e-7);
    assert_within(back, -0.141631, 5e-7);
    const double main_share = 0.25 / 1100.0, branch_share = 0.09 / 1200.0;
    assert_within(through, 2.0 * main_share / (2.0 * main_share + branch_share), 1e-9);
}

/* A dead end doubles a wave, a level throws it back with its sign changed. */
static void dead_ends_double_and_levels_invert(void **state)
{
    (void)state;
    kent_build build = kent_build_new(), *b = &build;
    const kent_watch watches[] = {{1, 1000.0}, {0, 0.0}};
    double head = 0.0, flow = 0.0;
    kent_trace trace;
    kent_error err = {0};

    kent_build_point(b, "R", 0.0, 0.0, 0.0);
    kent_build_point(b, "S", 1000.0, 0.0, 0.0);
    kent_build_point(b, "D", 2000.0, 0.0, 0.0);
    kent_build_pipe(b, "1", "R S", 0.5, 1000.0);
    kent_build_pipe(b, "2", "S D", 0.5, 1000.0);
    kent_build_fixed_level(b, "R", 50.0);
    const int o = kent_build_outflow(b, "S", 0.0);
    const int s = kent_build_scenario(b, "start", 10.0);
    kent_build_ramp(b, s, KENT_EVENT_OUTFLOW, o, 0.0, 0.0, 0.0);
    b->model->solver.time_step = 0.125;
    kent_build_derive(b);
    const double impedance = 1000.0 / (b->model->gravity * b->model->spans[0].area);
    b->model->events[0].to = -2.0 / impedance; /* 1 m to either side */

    march m = march_new(b, 10.0, 0, watches, 2, 1);
    march_until(&m, 1.5, &head, &flow);
    assert_within(head - 50.0, 2.0, 1e-9); /* at the dead end */
    assert_within(flow, 0.0, 1e-15);
    assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
    assert_within(trace.head[1], 50.0, 1e-9); /* at the level */
    assert_within(trace.flow[1], -2.0 / impedance, 1e-9 / impedance);
    march_clear(&m);
    kent_build_clear(b);
}

/* Laminar water hammer with quasi-steady friction: parameters of E. L. Holmboe and
 * W. T. Rouleau (1967; from memory), rise at the valve over rho a V0 by Laplace
 * inversion. */
static void laminar_friction_fills_the_pipe_as_laplace_inversion_says(void **state)
{
    (void)state;
    static const double when[] = {0.5, 1.0, 1.5, 1.9, 3.0, 5.0}; /* L/a */
    static const double want[] = {1.01379, 1.02749,  1.04110,
                                  1.05192, -0.86439, 0.92556};
    const double length = 36.09, a = 1324.0, bore = 0.025, v0 = 0.128; /* SI */
    const kent_watch valve = {0, length};
    kent_build build = kent_build_new(), *b = &build;

    b->model->gravity = G;
    b->model->water.viscosity = 3.967e-5 * b->model->water.density;
    kent_build_point(b, "R", 0.0, 0.0, 0.0);
    kent_build_point(b, "E", length, 0.0, 0.0);
    const int p = kent_build_pipe(b, "main", "R E", bore, a);
    b->model->pipes[p].friction = KENT_COLEBROOK_WHITE;
    kent_build_fixed_level(b, "R", 30.0);
    const int v = kent_build_valve(b, "V", "E", (double)NAN, 0.0);
    b->model->valves[v].flow = v0 * acos(-1.0) * 0.25 * bore * bore;
    const int s = kent_build_scenario(b, "shut", 1.0);
    kent_build_ramp(b, s, KENT_EVENT_VALVE, v, 0.0, 0.0, 0.0);
    b->model->solver.friction = KENT_SURGE_QUASI_STEADY;
    b->model->solver.time_step = length / a / 200.0;
    march m = march_new(b, 1.0, 0, &valve, 1, 1);
    const double steady = m.steady->node_head[b->model->spans[0].node[1]];
    for (int i = 0; i < 6; i++) {
        double head = 0.0, flow = 0.0;
        march_until(&m, when[i] * length / a, &head, &flow);
        assert_within((head - steady) * G / (a * v0), want[i], 0.005);
    }
    march_clear(&m);
    kent_build_clear(b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(linear_closures_give_allievis_heads),
        cmocka_unit_test(a_slow_closure_tends_to_the_limit_head),
        cmocka_unit_test(closures_of_a_kilometre_give_the_exact_highest_heads),
        cmocka_unit_test(an_instant_closure_gives_joukowskys_rise),
        cmocka_unit_test(junctions_split_waves_by_area_over_wave_speed),
        cmocka_unit_test(a_branch_takes_its_share_of_a_wave),
        cmocka_unit_test(dead_ends_double_and_levels_invert),
        cmocka_unit_test(laminar_friction_fills_the_pipe_as_laplace_inversion_says),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
