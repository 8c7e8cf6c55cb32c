#include "kent_friction.h"
#include "kent_check.h"

#include <math.h>
#include <stdbool.h>

static const double PI = 3.14159265358979323846;
#define COUNT(rows) (sizeof(rows) / sizeof(rows)[0])

/* White, Fluid Mechanics, eq. 6.54, table p. 345 */
static void smooth_pipes(void **state)
{
    (void)state;
    const double rows[][3] = {{4e3, .0399, .03992}, {1e4, .0309, .03089},
                              {1e5, .0180, .01799}, {1e6, .0116, .01165},
                              {1e7, .0081, .00810}, {1e8, .0059, .00594}};
    for (size_t i = 0; i < COUNT(rows); i++) {
        assert_within(kent_colebrook(rows[i][0], 0.0), rows[i][1], 1e-4);
        /* Prandtl's law itself: it has 0.8 where Colebrook's has 2 log10 2.51 = 0.7993.
         */
        assert_within(kent_colebrook(rows[i][0], 0.0), rows[i][2], 2e-5);
    }
}

/* White, eq. 6.63 and 6.64, p. 348 */
static void fully_rough_pipes(void **state)
{
    (void)state;
    const double rows[][2] = {
        {1e-5, .00806}, {1e-4, .0120}, {1e-3, .0196}, {0.01, .0379}, {0.05, .0716}};
    for (size_t i = 0; i < COUNT(rows); i++) {
        assert_within(kent_colebrook(1e13, rows[i][0]), rows[i][1], 5e-5);
    }
}

/* Colebrook (1939), and Swamee and Jain (1976), worked out apart from the program */
static void between_smooth_and_rough(void **state)
{
    (void)state;
    const double rows[][4] = {
        {1e4, 1e-3, .032382, .032665}, {1e5, 1e-4, .018514, .018452},
        {1e5, 1e-3, .022175, .022342}, {1e5, 1e-2, .038504, .038751},
        {1e6, 1e-4, .013441, .013508}, {1e6, 1e-3, .019943, .020029},
        {1e7, 1e-5, .008996, .009059}, {1e8, 1e-6, .006433, .006506}};
    for (size_t i = 0; i < COUNT(rows); i++) {
        assert_within(kent_colebrook(rows[i][0], rows[i][1]), rows[i][2], 1e-6);
        assert_within(kent_swamee_jain(rows[i][0], rows[i][1]), rows[i][3], 1e-6);
    }
}

/* Largest deviation over 1e-6 <= e/D <= 1e-2, 5e3 <= Re <= 1e8: 2.83 %, at Re 5e3 and
 * e/D 1e-2, worked out apart from the program. */
static void the_explicit_form_is_three_per_cent_off_at_worst(void **state)
{
    (void)state;
    double worst = 0.0;
    for (int i = 0; i <= 43; i++) {
        for (int j = 0; j <= 40; j++) {
            const double re = 5e3 * pow(10.0, 0.1 * i),
                         rough = 1e-6 * pow(10.0, 0.1 * j);
            const double f = kent_colebrook(re, rough);
            worst = fmax(worst, fabs(kent_swamee_jain(re, rough) / f - 1.0));
        }
    }
    assert_within(worst, 0.0283, 5e-5);
}

static void colebrook_is_solved_to_1e_12(void **state)
{
    (void)state;
    for (int i = 0; i <= 170; i++) {
        for (int j = 0; j <= 80; j++) {
            const double re = 4000.0 * pow(10.0, 0.05 * i);
            const double rough = 1e-9 * pow(10.0, 0.1 * j);
            const double f = kent_colebrook(re, rough);
            /* How far f is off, from what is left of the equation and its slope in x.
             */
            const long double x = 1.0L / sqrtl((long double)f);
            const long double inside = rough / 3.7L + 2.51L / re * x;
            const long double left = x + 2.0L * log10l(inside);
            const long double slope = 1.0L + 2.0L / logl(10.0L) * 2.51L / re / inside;
            assert_within((double)(2.0L * left / slope / x), 0.0, 1e-12);
        }
    }
}

static void laminar_then_a_straight_line_then_turbulent(void **state)
{
    (void)state;
    assert_close(kent_colebrook(1.0, 0.01), 64.0, 1e-15);
    assert_close(kent_colebrook(0.25, 0.01), 64.0, 1e-15); /* counts as 1 */
    assert_close(kent_colebrook(0.0, 0.01), 64.0, 1e-15);
    assert_close(kent_colebrook(1600.0, 0.01), 0.04, 1e-15);
    assert_close(kent_colebrook(2000.0, 0.01), 0.032, 1e-15);
    const double end = kent_colebrook(4000.0, 1e-3);
    assert_close(kent_colebrook(3000.0, 1e-3), 0.5 * (0.032 + end), 1e-14);
    assert_close(kent_colebrook(2000.0 + 1e-6, 1e-3), 0.032, 1e-9);
    assert_close(kent_colebrook(4000.0 - 1e-6, 1e-3), end, 1e-9);
}

static double loss(kent_friction_law law, double coefficient, double bore, double flow,
                   double length)
{
    const kent_friction f = {law, coefficient, bore, 1.139e-6, 9.81};
    double derivative = 0.0;
    return length * kent_friction_slope(&f, flow, &derivative);
}

/* Cengel and Cimbala, Fluid Mechanics, ex. 8-3, p. 360 */
static void water_through_a_steel_pipe(void **state)
{
    (void)state;
    const kent_friction f = {KENT_COLEBROOK_WHITE, 2e-6, 0.050, 1.138e-3 / 999.0, 9.81};
    const double v = 6e-3 / (0.25 * PI * 0.0025);
    double derivative = 0.0;
    assert_close(v * 0.050 / f.kinematic_viscosity, 134300.0, 5e-3);
    assert_close(kent_friction_factor(&f, v), 0.0172, 5e-3);
    const double head = 60.0 * kent_friction_slope(&f, 6e-3, &derivative);
    assert_close(999.0 * 9.81 * head, 96.5e3, 5e-3);
    assert_close(head, 9.82, 5e-3);
}

/* Cengel and Cimbala, ex. 8-8, p. 377: water of 10 degC, 999.7 kg/m3, 1.307 mPa s */
static void water_between_two_reservoirs(void **state)
{
    (void)state;
    const kent_friction f = {KENT_COLEBROOK_WHITE, 0.26e-3, 0.050, 1.307e-3 / 999.7,
                             9.81};
    const double v = 6e-3 / (0.25 * PI * 0.0025);
    const double minor = (0.5 + 2.0 * 0.3 + 0.2 + 1.06) * v * v / (2.0 * 9.81);
    double derivative = 0.0;
    assert_close(kent_friction_factor(&f, v), 0.0315, 2e-3);
    const double head = 89.0 * kent_friction_slope(&f, 6e-3, &derivative) + minor;
    assert_close(head + 4.0, 31.8, 2e-3);
}

/* Subramanya, 1000 Solved Problems in Fluid Mechanics, ex. 11.4, p. 239 */
static void pipes_in_series_and_in_parallel(void **state)
{
    (void)state;
    const double length[] = {1800.0, 1200.0, 600.0}, bore[] = {0.5, 0.4, 0.3};
    double in_series = 0.0, in_parallel = 0.0;
    for (int i = 0; i < 3; i++) {
        in_series += loss(KENT_DARCY_FIXED, 0.02, bore[i], 0.2, length[i]);
        in_parallel +=
            sqrt(1.0 / loss(KENT_DARCY_FIXED, 0.02, bore[i], 1.0, length[i]));
    }
    assert_close(in_series / loss(KENT_DARCY_FIXED, 0.02, 0.4, 0.2, 1.0), 4318.2, 1e-3);
    /* At a loss of 1 m the parallel pipes pass in_parallel m3/s. */
    assert_close(1.0 / loss(KENT_DARCY_FIXED, 0.02, 0.5, in_parallel, 1.0), 377.4,
                 1e-3);
}

/* 10.667 L Q^1.852/(C^1.852 d^4.8704): constants from memory, values worked out apart
 */
static void hazen_williams_in_si(void **state)
{
    (void)state;
    assert_close(loss(KENT_HAZEN_WILLIAMS, 130, 0.30, 0.10, 1000), 6.4217, 2e-3);
    assert_close(loss(KENT_HAZEN_WILLIAMS, 100, 0.25, 0.05, 1000), 7.0276, 2e-3);
    assert_close(loss(KENT_HAZEN_WILLIAMS, 140, 0.60, 0.50, 1000), 3.7705, 2e-3);
    /* The law as written, against the Darcy factor it is handed over as. */
    assert_close(loss(KENT_HAZEN_WILLIAMS, 130, 0.30, 0.10, 1000),
                 10.667 * 1000 * pow(0.1, 1.852) / (pow(130, 1.852) * pow(0.3, 4.8704)),
                 1e-12);
}

/* In ft per 1000 ft, and psi per 100 ft by 4.52 Q^1.85/(C^1.85 d^4.87), the form of the
 * NFPA standards (seen in a fire-protection reference) */
static void hazen_williams_in_us_units(void **state)
{
    (void)state;
    const double gpm = 6.30901964e-5, inch = 0.0254;
    const double rows[][5] = {{500, 130, 8, 5.055, 0.2185},
                              {1000, 130, 12, 2.533, 0.1093},
                              {1000, 100, 12, 4.117, 0.1776}};
    for (size_t i = 0; i < COUNT(rows); i++) {
        const double got = loss(KENT_HAZEN_WILLIAMS, rows[i][1], rows[i][2] * inch,
                                rows[i][0] * gpm, 1000.0);
        assert_close(got, rows[i][3], 5e-3);
        assert_close(got / 10.0 * 62.4 / 144.0, rows[i][4], 5e-3);
    }
}

/* Manning's formula as written: slope = (n V)^2 / R^(4/3), R = D/4 */
static void manning_is_handed_over_as_a_darcy_factor(void **state)
{
    (void)state;
    const double v = 0.3 / (0.25 * PI * 0.36);
    assert_close(loss(KENT_MANNING, 0.011, 0.6, 0.3, 1.0),
                 0.011 * 0.011 * v * v / pow(0.15, 4.0 / 3.0), 1e-12);
}

static const kent_friction LAWS[] = {
    {KENT_COLEBROOK_WHITE, 1e-4, 0.3, 1.139e-6, 9.80665},
    {KENT_COLEBROOK_WHITE, 0.0, 0.3, 1.139e-6, 9.80665},
    {KENT_COLEBROOK_WHITE, 0.015, 0.3, 1.139e-6, 9.80665},
    {KENT_HAZEN_WILLIAMS, 130.0, 0.3, 1.139e-6, 9.80665},
    {KENT_MANNING, 0.011, 0.3, 1.139e-6, 9.80665},
    {KENT_DARCY_FIXED, 0.02, 0.3, 1.139e-6, 9.80665},
};

static double flow_at(const kent_friction *f, double reynolds)
{
    return reynolds * f->kinematic_viscosity / f->bore * 0.25 * PI * f->bore * f->bore;
}

static void the_derivative_is_that_of_the_slope(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(LAWS); i++) {
        for (int j = 0; j < 146; j++) {
            const double re = 1e-12 * pow(1.37, j); /* to 7e7 */
            double derivative = 0.0, unused = 0.0;
            const double q = flow_at(&LAWS[i], re), h = 1e-5 * q;
            (void)kent_friction_slope(&LAWS[i], q, &derivative);
            const double rise = kent_friction_slope(&LAWS[i], q + h, &unused) -
                                kent_friction_slope(&LAWS[i], q - h, &unused);
            assert_close(rise / (2.0 * h), derivative, 1e-7);
        }
    }
}

static void every_law_is_laminar_near_rest_and_rises_from_nothing(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(LAWS); i++) {
        const kent_friction *f = &LAWS[i];
        double at_rest = 0.0, derivative = 0.0;
        assert_true(kent_friction_slope(f, 0.0, &at_rest) == 0.0);
        /* Hagen and Poiseuille: 128 nu/(pi g D^4) */
        assert_close(at_rest,
                     128.0 * f->kinematic_viscosity /
                         (PI * f->gravity * pow(f->bore, 4.0)),
                     1e-12);
        assert_close(kent_friction_slope(f, flow_at(f, 100.0), &derivative),
                     at_rest * flow_at(f, 100.0), 1e-12);
        double last = 0.0;
        for (int j = 0; j < 241; j++) {
            const double re = 1e-3 * pow(1.1, j); /* to 9e6 */
            const double got = kent_friction_slope(f, flow_at(f, re), &derivative);
            assert_true(got > last && derivative > 0.0);
            last = got;
        }
        assert_true(isfinite(kent_friction_factor(f, 0.0)));
    }
}

static void loss_follows_the_flow_in_sign_and_factor_in_size(void **state)
{
    (void)state;
    for (size_t i = 0; i < COUNT(LAWS); i++) {
        const kent_friction *f = &LAWS[i];
        for (int j = 0; j < 8; j++) {
            const double re = 10.0 * pow(7.0, j); /* to 8e6 */
            double forth = 0.0, back = 0.0;
            const double q = flow_at(f, re), v = re * f->kinematic_viscosity / f->bore;
            const double got = kent_friction_slope(f, q, &forth);
            assert_true(kent_friction_slope(f, -q, &back) == -got && back == forth);
            assert_true(kent_friction_factor(f, -v) == kent_friction_factor(f, v));
            assert_close(
                got, kent_friction_factor(f, v) * v * v / (2.0 * f->gravity * f->bore),
                1e-13);
        }
    }
}

static void without_friction_there_is_no_loss(void **state)
{
    (void)state;
    const kent_friction none = {KENT_FRICTIONLESS, 0.0, 0.3, 1.139e-6, 9.80665};
    double derivative = 1.0;
    assert_true(kent_friction_factor(&none, 2.0) == 0.0);
    assert_true(kent_friction_slope(&none, 0.3, &derivative) == 0.0);
    assert_true(derivative == 0.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(smooth_pipes),
        cmocka_unit_test(fully_rough_pipes),
        cmocka_unit_test(between_smooth_and_rough),
        cmocka_unit_test(the_explicit_form_is_three_per_cent_off_at_worst),
        cmocka_unit_test(colebrook_is_solved_to_1e_12),
        cmocka_unit_test(laminar_then_a_straight_line_then_turbulent),
        cmocka_unit_test(water_through_a_steel_pipe),
        cmocka_unit_test(water_between_two_reservoirs),
        cmocka_unit_test(pipes_in_series_and_in_parallel),
        cmocka_unit_test(hazen_williams_in_si),
        cmocka_unit_test(hazen_williams_in_us_units),
        cmocka_unit_test(manning_is_handed_over_as_a_darcy_factor),
        cmocka_unit_test(the_derivative_is_that_of_the_slope),
        cmocka_unit_test(every_law_is_laminar_near_rest_and_rises_from_nothing),
        cmocka_unit_test(loss_follows_the_flow_in_sign_and_factor_in_size),
        cmocka_unit_test(without_friction_there_is_no_loss),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
