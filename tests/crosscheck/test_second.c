/* The second method against answers in closed form. */
#include "nets.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
static const double G = 9.81; /* m/s2, as in the published answers */

static void without_an_event_nothing_moves(void **state)
{
    (void)state;
    kent_build b = nets_loop();
    kent_second_peak peaks[7];
    kent_steady *s = nets_steady(&b);
    (void)nets_run(&b, s, -1, 60.0, (kent_mesh){20.0, 1, 1.0}, peaks);
    for (size_t n = 0; n < b.model->node_count; n++) { /* M has two, of one point */
        const kent_second_peak *p = &peaks[b.model->nodes[n].point];
        const bool high = fabs(p->highest - s->node_head[n]) < 1e-6;
        const bool low = fabs(p->lowest - s->node_head[n]) < 1e-6;
        assert_true(high || low);
        if (b.model->nodes[n].kind != KENT_NODE_VALVE) assert_true(high && low);
    }
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* Reservoir - frictionless pipe - valve that discharges to nil and closes in a straight
 * line. The answers know no velocity head: wave speed and length are taken 100 times as
 * large and V0 100 times as small, as in tests/surge. */
static void close_valve(double rho, double theta, int cells, double at_most,
                        kent_second_peak *valve)
{
    const double a = 1e5, h0 = 100.0; /* m/s, m; L/a = 1 s */
    const double v0 = rho * 2.0 * G * h0 / a;
    kent_second_peak peaks[2];
    kent_build b = kent_build_new();
    b.model->gravity = G;
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", a, 0.0, 0.0);
    kent_build_pipe(&b, "main", "R E", 0.5, a);
    kent_build_fixed_level(&b, "R", h0);
    const double capacity = v0 * 0.25 * PI * 0.25 / sqrt(h0);
    const int v = kent_build_valve(&b, "V", "E", capacity, 0.0);
    const int s = kent_build_scenario(&b, "shut", at_most);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.0, 2.0 * theta, 0.0);
    b.model->solver.friction = KENT_SURGE_NONE;
    kent_steady *steady = nets_steady(&b);
    (void)nets_run(&b, steady, 0, 0.0, (kent_mesh){a / cells, 1, 1.0}, peaks);
    *valve = peaks[1];
    kent_steady_free(steady);
    kent_build_clear(&b);
}

/* L. Allievi's interlocking equations (Theory of Water-Hammer, 1925), evaluated: rho =
 * a V0/(2 g H0), theta = closing time over 2L/a; heads over H0, time in 2L/a. */
static const struct {
    double rho, theta, highest, when;
} ALLIEVI[] = {
    {0.5, 2, 1.40693, 1.0}, {0.5, 5, 1.14424, 1.0}, {1, 2, 1.75189, 1.445},
    {1, 3, 1.43298, 1.43},  {1, 5, 1.23284, 1.417}, {2, 3, 1.95226, 2.465},
    {4, 3, 3.6497, 3.0},    {4, 5, 2.19034, 4.62},
};

/* Within what N against 2N cells admits, and 0.1 % of the head. */
static void linear_closures_give_allievis_heads(void **state)
{
    (void)state;
    for (size_t i = 0; i < sizeof ALLIEVI / sizeof ALLIEVI[0]; i++) {
        kent_second_peak coarse, fine;
        const double until = 2.0 * ALLIEVI[i].theta + 0.5;
        close_valve(ALLIEVI[i].rho, ALLIEVI[i].theta, 100, until, &coarse);
        close_valve(ALLIEVI[i].rho, ALLIEVI[i].theta, 200, until, &fine);
        const double own = fabs(fine.highest - coarse.highest) / 100.0;
        print_message("rho %g theta %g: %.5f, own error %.5f, at %.3f\n",
                      ALLIEVI[i].rho, ALLIEVI[i].theta, fine.highest / 100.0, own,
                      fine.highest_at / 2.0);
        assert_within(fine.highest / 100.0, ALLIEVI[i].highest,
                      own + 1e-3 * ALLIEVI[i].highest);
        assert_within(fine.highest_at / 2.0, ALLIEVI[i].when, 0.03);
    }
}

/* Rise over H0 tends to n/2 + sqrt(n + n^2/4) with n = (rho/theta)^2 where the column
 * is rigid: L. Allievi, 1925, and any text on rigid columns. */
static void a_rigid_column_gives_the_limit_head(void **state)
{
    (void)state;
    const double rho = 4.0, theta = 20.0, n = rho * rho / (theta * theta);
    kent_second_peak peaks[2];
    const double length = 1000.0, h0 = 100.0; /* m */
    const double v0 = rho * 2.0 * G * h0 / 1000.0;
    kent_build b = kent_build_new();
    b.model->gravity = G;
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", length, 0.0, 0.0);
    kent_build_pipe(&b, "main", "R E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", h0);
    const double area = 0.25 * PI * 0.25;
    const double k = v0 * v0 / (2.0 * G); /* m, lost at the reservoir */
    const int v = kent_build_valve(&b, "V", "E", v0 * area / sqrt(h0), 0.0);
    const int s = kent_build_scenario(&b, "shut", 2.0 * theta);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.0, 2.0 * theta, 0.0);
    b.model->solver.friction = KENT_SURGE_NONE;
    kent_steady *steady = nets_steady(&b);
    (void)nets_run(&b, steady, 0, 0.0, (kent_mesh){INFINITY, 1, 1000.0}, peaks);
    const double limit = h0 * (1.0 + n / 2.0 + sqrt(n + n * n / 4.0));
    print_message("rigid: %.3f m, limit %.3f m\n", peaks[1].highest, limit);
    assert_true(k < h0);
    assert_close(peaks[1].highest, limit, 1e-2);
    kent_steady_free(steady);
    kent_build_clear(&b);
}

/* A dead end at M's far side draws q0 sin^4 for 1 s. What it lowers travels unchanged,
 * a q/(gA), and comes back from the level with its sign turned, at the end doubled:
 * d'Alembert's solution. */
static void pulse(int cells, double q0, kent_second_peak *middle, kent_second_peak *end,
                  double *rise)
{
    enum { PIECES = 400 };
    static kent_law_point law[PIECES + 1];
    const double area = 0.25 * PI * 0.25;
    kent_second_peak peaks[3];
    kent_build b = kent_build_new();
    b.model->gravity = G;
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "M", 430.0, 0.0, 0.0);
    kent_build_point(&b, "E", 1000.0, 0.0, 0.0);
    kent_build_pipe(&b, "main", "R M E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", 100.0);
    const int o = kent_build_outflow(&b, "E", 0.0);
    const int s = kent_build_scenario(&b, "pulse", 3.0);
    for (int i = 0; i <= PIECES; i++) {
        const double x = (double)i / PIECES;
        law[i] = (kent_law_point){0.2 + x, q0 * pow(sin(PI * x), 4.0)};
    }
    kent_build_law(&b, s, KENT_EVENT_OUTFLOW, o, 0.0, law, PIECES + 1);
    b.model->solver.friction = KENT_SURGE_NONE;
    kent_steady *steady = nets_steady(&b);
    (void)nets_run(&b, steady, 0, 0.0, (kent_mesh){1000.0 / cells, 1, 1.0}, peaks);
    *middle = peaks[1];
    *end = peaks[2];
    *rise = 1000.0 * q0 / (G * area);
    kent_steady_free(steady);
    kent_build_clear(&b);
}

static void a_smooth_pulse_converges_in_second_order(void **state)
{
    (void)state;
    double before[2] = {0.0, 0.0};
    for (int cells = 40; cells <= 160; cells *= 2) {
        kent_second_peak middle, end;
        double rise = 0.0;
        pulse(cells, 0.02, &middle, &end, &rise);
        const double error[2] = {fabs(middle.lowest - (100.0 - rise)),
                                 fabs(end.highest - (100.0 + 2.0 * rise))};
        for (int i = 0; i < 2; i++) {
            if (before[i] > 0.0) {
                const double order = log2(before[i] / error[i]);
                print_message("%d cells: error %.5f m of %.1f, order %.2f\n", cells,
                              error[i], rise, order);
                assert_true(order >= 1.8);
            }
            before[i] = error[i];
        }
    }
}

/* Joukowsky's rise a V0/g, and no more than 1 % above it. N. Joukowsky, 1898 */
static void a_sudden_closure_does_not_overshoot(void **state)
{
    (void)state;
    kent_second_peak valve;
    close_valve(0.2, 0.0, 200, 1.9, &valve);
    const double rise = 2.0 * 0.2 * 100.0; /* m: 2 rho H0 */
    assert_within(valve.highest, 100.0 + rise, 0.01 * rise);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(without_an_event_nothing_moves),
        cmocka_unit_test(linear_closures_give_allievis_heads),
        cmocka_unit_test(a_rigid_column_gives_the_limit_head),
        cmocka_unit_test(a_smooth_pulse_converges_in_second_order),
        cmocka_unit_test(a_sudden_closure_does_not_overshoot),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
