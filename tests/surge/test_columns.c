/* Establishment and retardation of flow: a rigid column's answers, met by a line so
 * stiff that waves pass it in no time. */
#include "march.h"

#include <math.h>

static const double G = 9.81;      /* m/s2 */
static const double SPEED = 1.0e5; /* m/s: near-rigid */

/* A tank, a pipe with entrance loss K = 0.5 and f = 0.02, and a free outlet opened at
 * t = 0. Times by t = (L Vf/(2 g H)) ln((1 + x)/(1 - x)) at x = V/Vf.
 * First three: R. L. Daugherty and J. B. Franzini, Fluid Mechanics with Engineering
 * Applications, ex. 13.3 (printed 0.577, 1.242, 2.201 s); the others derived. */
static const struct {
    double length, bore, head; /* m */
    double share, time;        /* of the final speed, s */
} ESTABLISHED[] = {
    {15.0, 0.1, 2.0, 0.25, 0.577},    {15.0, 0.1, 2.0, 0.50, 1.242},
    {15.0, 0.1, 2.0, 0.75, 2.201},    {150.0, 0.1, 2.0, 0.50, 4.687},
    {150.0, 0.1, 2.0, 0.99, 22.58},   {1500.0, 0.1, 2.0, 0.50, 15.151},
    {1500.0, 0.1, 2.0, 0.99, 73.00},  {3000.0, 0.3, 20.0, 0.90, 31.41},
    {3000.0, 0.3, 20.0, 0.99, 56.47},
};

static void flow_is_established_as_in_a_rigid_column(void **state)
{
    (void)state;
    for (size_t i = 0; i < sizeof ESTABLISHED / sizeof ESTABLISHED[0]; i++) {
        const double length = ESTABLISHED[i].length, bore = ESTABLISHED[i].bore;
        const double area = acos(-1.0) * 0.25 * bore * bore;
        const kent_watch end = {0, length};
        kent_build b = kent_build_new();
        b.model->gravity = G;
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "E", length, 0.0, 0.0);
        const int p = kent_build_pipe(&b, "main", "R E", bore, SPEED);
        b.model->pipes[p].friction = KENT_DARCY_FIXED;
        b.model->pipes[p].friction_coefficient = 0.02;
        const int r = kent_build_fixed_level(&b, "R", ESTABLISHED[i].head);
        b.model->fixed_levels[r].loss = 0.5;
        /* open, it loses 1e-6 V2/2g */
        const int v = kent_build_valve(&b, "V", "E", 1e3 * area * sqrt(2.0 * G), 0.0);
        b.model->valves[v].opening = 0.0;
        const int s = kent_build_scenario(&b, "open", 100.0);
        kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.0, 1e-9, 1.0);
        b.model->solver.friction = KENT_SURGE_CONSTANT;
        b.model->solver.time_step = 0.25 * length / SPEED;
        march m = march_new(&b, 100.0, s, &end, 1, 1);
        kent_trace trace;
        kent_error err = {0};
        double before = 0.0, time = 0.0, speed = 0.0;
        const double final = sqrt(2.0 * G * ESTABLISHED[i].head /
                                  (1.5 + 0.02 * length / bore)); /* m/s */
        const double wanted = ESTABLISHED[i].share * final;
        while (speed < wanted) {
            before = time;
            assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
            time = trace.time[0];
            speed = trace.flow[0] / area;
        }
        assert_close(0.5 * (before + time), ESTABLISHED[i].time, 0.003);
        march_clear(&m);
        kent_build_clear(&b);
    }
}

/* A tank at nil and a frictionless pipe that draws a flow as law says, at its end. */
static march drawn(kent_build *b, double gravity, double length, double bore,
                   double wave_speed, const kent_law_point *law, size_t count)
{
    const kent_watch end = {0, length};
    *b = kent_build_new();
    b->model->gravity = gravity;
    kent_build_point(b, "R", 0.0, 0.0, 0.0);
    kent_build_point(b, "E", length, 0.0, -1000.0); /* the pressure is never nil */
    const int p = kent_build_pipe(b, "main", "R E", bore, wave_speed);
    b->model->pipes[p].length = length;
    kent_build_fixed_level(b, "R", 0.0);
    const int o = kent_build_outflow(b, "E", law[0].value);
    const int s = kent_build_scenario(b, "less", 60.0);
    kent_build_law(b, s, KENT_EVENT_OUTFLOW, o, 0.0, law, count);
    b->model->solver.friction = KENT_SURGE_NONE;
    b->model->solver.time_step = 0.25 * length / wave_speed;
    return march_new(b, 60.0, s, &end, 1, 1);
}

/* M. Paradise, Problems in Hydraulics, ex. 6.5: 5000 ft of 24 in, 18 cusec, stopped
 * over 10 s as V0 (1 - (t/10 s)^2): rho L dV/dt = 77.1 psi at the end (printed 77.6,
 * with V2/2g and 2.3 ft to a psi); stopped at once, bulk modulus 275 000 psi: 348 psi.
 */
static void a_column_is_stopped_by_its_inertia(void **state)
{
    (void)state;
    enum { POINTS = 4001 };
    static kent_law_point law[POINTS];
    const double foot = 0.3048, cusec = foot * foot * foot;
    const double psi = 144.0 / 62.4 * foot; /* m of water of 62.4 lb/ft3 */
    for (int i = 0; i < POINTS; i++) {
        const double t = 10.0 * i / (POINTS - 1);
        law[i] = (kent_law_point){t, 18.0 * cusec * (1.0 - 0.01 * t * t)};
    }
    kent_build b;
    march m = drawn(&b, 32.2 * foot, 5000.0 * foot, 2.0 * foot, SPEED, law, POINTS);
    double head = 0.0, flow = 0.0;
    march_until(&m, 9.99, &head, &flow);
    assert_close(head / psi, 77.1, 0.003);
    march_clear(&m);
    kent_build_clear(&b);

    const kent_law_point at_once[] = {{0.0, 18.0 * cusec}, {1e-9, 0.0}};
    const double wave_speed = sqrt(275000.0 * 144.0 * 32.2 / 62.4) * foot;
    m = drawn(&b, 32.2 * foot, 5000.0 * foot, 2.0 * foot, wave_speed, at_once, 2);
    const double before = m.steady->node_head[1];
    march_until(&m, 1.0, &head, &flow);
    assert_close((head - before) / psi, 348.0, 0.002);
    march_clear(&m);
    kent_build_clear(&b);
}

/* J. F. Douglas, Fluid Mechanics, ex. 5.1: 60 m retarded by 0.02 m/s2: 1.2 kPa. Waves
 * swing about it without end: the mean of their period 4 L/a. */
static void retarding_a_column_takes_pressure(void **state)
{
    (void)state;
    enum { PERIOD = 16 }; /* steps */
    const double length = 60.0, bore = 0.2, area = acos(-1.0) * 0.25 * bore * bore;
    const kent_law_point law[] = {{0.0, 1e-3}, {10.0, 1e-3 - 0.2 * area}};
    kent_build b;
    march m = drawn(&b, G, length, bore, SPEED, law, 2);
    kent_trace trace;
    kent_error err = {0};
    double sum = 0.0;
    for (int i = 0; i < 20 * PERIOD; i++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        sum += i < 10 * PERIOD ? 0.0 : trace.head[0];
    }
    assert_close(1000.0 * G * sum / (10.0 * PERIOD), 1200.0, 0.003);
    march_clear(&m);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(flow_is_established_as_in_a_rigid_column),
        cmocka_unit_test(a_column_is_stopped_by_its_inertia),
        cmocka_unit_test(retarding_a_column_takes_pressure),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
