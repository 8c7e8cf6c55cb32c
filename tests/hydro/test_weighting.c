#include "kent_weighting.h"
#include "kent_check.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

/* The zero of the Bessel function J2 next to a guess, by Newton: J2' = J1 - 2 J2/x. */
static double zero_near(double x)
{
    for (int i = 0; i < 20; i++) {
        x -= jn(2, x) / (j1(x) - 2.0 * jn(2, x) / x);
    }
    return x;
}

enum { ZEROS = 3000 };

/* W by its definition: W. Zielke, Frequency-dependent friction in transient pipe flow,
 * J. Basic Engineering, 1968: the sum over the zeros of J2. */
static double exact_laminar(double tau)
{
    static double zero[ZEROS];
    double w = 0.0;
    if (zero[0] == 0.0) {
        for (int k = 0; k < ZEROS; k++) {
            const double b = PI * (k + 1.75);
            zero[k] = zero_near(b - 15.0 / (8.0 * b));
        }
    }
    for (int k = ZEROS; k-- > 0;) {
        w += exp(-zero[k] * zero[k] * tau);
    }
    return w;
}

/* Published, from memory: the sum over the zeros of J2 to 0.02 %. */
static void laminar_weight_is_zielkes(void **state)
{
    (void)state;
    static const double tau[] = {1e-4, 1e-3, 0.01, 0.02, 0.05, 0.1, 0.2};
    static const double want[] = {26.9702,  7.70502,  1.68646, 0.913967,
                                  0.297603, 0.072382, 0.005119};
    for (int i = 0; i < 7; i++) {
        assert_close(kent_zielke_weight(tau[i]), want[i], 0.0002);
        assert_close(exact_laminar(tau[i]), want[i], 0.0002);
    }
    for (int i = 0; i < 125; i++) { /* up to 0.3 */
        const double t = 2e-6 * pow(1.1, i);
        assert_close(kent_zielke_weight(t), exact_laminar(t), 0.0002);
    }
}

/* A. K. Trikha, J. Fluids Engineering, 1975 (from memory). */
static void trikhas_three_terms_are_far_off_at_times(void **state)
{
    (void)state;
    static const double tau[] = {1e-4, 1e-3, 0.01, 0.02, 0.05, 0.1, 0.2};
    static const double want[] = {26.910, 7.619,   1.864,  0.7381,
                                  0.2675, 0.07136, 0.00509};
    double worst = 0.0;
    for (int i = 0; i < 7; i++) {
        assert_close(kent_trikha_weight(tau[i]), want[i], 0.0005); /* as printed */
    }
    /* published: "up to 37 % off near 0.005"; it is 38.4 % at 0.004 */
    assert_within(kent_trikha_weight(0.005) / kent_zielke_weight(0.005) - 1.0, 0.37,
                  0.005);
    for (int i = 0; i < 384; i++) { /* up to 0.2 */
        const double t = 1e-4 * pow(1.02, i);
        worst = fmax(worst, fabs(kent_trikha_weight(t) / kent_zielke_weight(t) - 1.0));
    }
    assert_within(worst, 0.384, 0.0005);
}

/* A. E. Vardy and J. M. B. Brown: 2003 (J. Sound and Vibration) and 1995/96 (J.
 * Hydraulic Research; Int. Conf. Pressure Surges); formulas from memory. k is the
 * Brunone coefficient, sqrt(C)/2. */
static void turbulent_decay_is_vardy_and_browns(void **state)
{
    (void)state;
    static const double re[] = {1e4, 1e5, 1e6};
    static const double late[] = {0.001900, 0.000402, 0.000111};
    static const double late_k[] = {0.021796, 0.010030, 0.005260};
    static const double early[] = {0.001118, 0.000220, 0.000055};
    static const double early_k[] = {0.016719, 0.007422, 0.003697};
    for (int i = 0; i < 3; i++) {
        const double c = kent_shear_decay(re[i]), old = kent_shear_decay_1996(re[i]);
        assert_within(c, late[i], 0.5e-6); /* as printed: six decimals */
        assert_within(old, early[i], 0.5e-6);
        assert_close(sqrt(c) / 2.0, late_k[i], 0.001);
        assert_close(sqrt(old) / 2.0, early_k[i], 0.001);
        assert_true(c / old > 1.65 && c / old < 2.05); /* the conflict */
    }
    assert_close(KENT_LAMINAR_SHEAR_DECAY, 0.00476, 1e-12); /* from memory */
    assert_close(sqrt(KENT_LAMINAR_SHEAR_DECAY) / 2.0, 0.034496, 1e-4);
}

static double sum_at(const kent_weighting *w, double tau)
{
    double sum = 0.0;
    for (size_t i = 0; i < w->count; i++) {
        assert_true(w->weight[i] > 0.0 && w->rate[i] > 0.0);
        sum += w->weight[i] * exp(-w->rate[i] * tau);
    }
    return sum;
}

/* All of W from 0 on: what a jump has cost when it is over. */
static double whole(const kent_weighting *w)
{
    double sum = w->at_once;
    for (size_t i = 0; i < w->count; i++) {
        sum += w->weight[i] / w->rate[i];
    }
    return sum;
}

static void the_sum_is_within_half_a_percent_of_zielkes_series(void **state)
{
    (void)state;
    static const double step[] = {1e-6, 1e-5, 3e-4, 0.004, 0.05};
    for (int i = 0; i < 5; i++) {
        const kent_weighting w = kent_weighting_sum(1000.0, step[i]);
        double worst = 0.0;
        const int times = (int)(log(0.4 / step[i]) / log(1.05));
        for (int j = 0; j <= times; j++) {
            const double t = step[i] * pow(1.05, j);
            worst = fmax(worst, fabs(sum_at(&w, t) / exact_laminar(t) - 1.0));
        }
        print_message("step %g: %zu terms, within %.2g\n", step[i], w.count, worst);
        assert_true(worst < 0.005);
        assert_close(whole(&w), 1.0 / 12.0, 0.001); /* sum of 1/j^2 = 1/(4 (2 + 1)) */
    }
}

static void the_sum_is_within_half_a_percent_of_the_turbulent_weight(void **state)
{
    (void)state;
    static const double re[] = {2001.0, 4000.0, 1e5, 1e6, 3e7};
    static const double step[] = {1e-10, 1e-8, 1e-6, 1e-4};
    for (int i = 0; i < 5; i++) {
        const double c = fmin(kent_shear_decay(re[i]), KENT_LAMINAR_SHEAR_DECAY);
        for (int j = 0; j < 4; j++) {
            const kent_weighting w = kent_weighting_sum(re[i], step[j]);
            double worst = 0.0;
            const int times = (int)(log(5.0 * c / step[j]) / log(1.05));
            for (int k = 0; k <= times; k++) {
                const double t = step[j] * pow(1.05, k);
                worst = fmax(worst,
                             fabs(sum_at(&w, t) / kent_turbulent_weight(t, c) - 1.0));
            }
            print_message("Re %g step %g: %zu terms, within %.2g\n", re[i], step[j],
                          w.count, worst);
            assert_true(worst < 0.005);
            assert_true(w.count < 30);
            /* integral of e^(-t/C)/(2 sqrt(pi t)) */
            assert_close(whole(&w), 0.5 * sqrt(c), 0.0025);
        }
    }
}

/* However long or short the step, no more is kept than there is room for, and what a
 * jump costs in the end stays what it is. */
static void steps_beyond_all_reason_are_borne(void **state)
{
    (void)state;
    static const double step[] = {1e-12, 1.0, 1e3};
    for (int i = 0; i < 3; i++) {
        const kent_weighting laminar = kent_weighting_sum(81.0, step[i]);
        const kent_weighting turbulent = kent_weighting_sum(1e5, step[i]);
        assert_close(whole(&laminar), 1.0 / 12.0, 0.001);
        assert_close(whole(&turbulent), 0.5 * sqrt(kent_shear_decay(1e5)), 0.0025);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(laminar_weight_is_zielkes),
        cmocka_unit_test(trikhas_three_terms_are_far_off_at_times),
        cmocka_unit_test(turbulent_decay_is_vardy_and_browns),
        cmocka_unit_test(the_sum_is_within_half_a_percent_of_zielkes_series),
        cmocka_unit_test(the_sum_is_within_half_a_percent_of_the_turbulent_weight),
        cmocka_unit_test(steps_beyond_all_reason_are_borne),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
