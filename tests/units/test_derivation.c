#include "kent_arith.h"
#include "kent_check.h"
#include "kent_derivation.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

enum { TEXT = 400 };

static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

/* A 22.5 degree bend at 14.2 bar: enough of a hand calculation to print. */
static kent_derivation a_bend(void)
{
    kent_derivation d = {0};
    const double p = 14.2e5, diameter = 0.635, theta = 22.5 * DEGREE;
    const double area = 0.25 * 3.14159265358979323846 * diameter * diameter;

    kent_derivation_heading(&d, "Bend");
    kent_derivation_put(&d, "p", p, KENT_PRESSURE, KENT_GIVEN, "pressure");
    kent_derivation_put(&d, "D", diameter, KENT_DIAMETER, KENT_CATALOGUE, "diameter");
    kent_derivation_put(&d, "theta", theta, KENT_ANGLE, KENT_GIVEN, "turn");
    kent_derivation_work(&d, "A", area, KENT_AREA, "pi/4*D^2", "8.2", "area");
    kent_derivation_work(&d, "T", 2.0 * p * area * sin(0.5 * theta), KENT_FORCE,
                         "2*p*A*sin(theta/2)", "8.7", "thrust");
    kent_derivation_put(&d, "W", -2500.0, KENT_FORCE, KENT_GIVEN, "weight");
    kent_derivation_work(&d, "T_z", -2.0 * 2500.0, KENT_FORCE, "2*W", "", "down");
    return d;
}

static void assert_numbers(const kent_derivation *d, size_t line, kent_system system,
                           const char *want)
{
    char got[TEXT];
    kent_line_numbers(d, line, system, got, sizeof got);
    assert_string_equal(got, want);
}

static void assert_value(const kent_derivation *d, size_t line, kent_system system,
                         const char *want)
{
    char got[TEXT];
    kent_line_value(&d->lines[line], system, got, sizeof got);
    assert_string_equal(got, want);
}

static void symbols_become_their_printed_digits(void **state)
{
    (void)state;
    kent_derivation d = a_bend();
    assert_numbers(&d, 4, KENT_SI, "pi/4*0.635000^2");
    assert_numbers(&d, 5, KENT_SI, "2*1420.00*0.316692*sin(22.5000deg/2)");
    assert_value(&d, 5, KENT_SI, "175.465 kN");
    kent_derivation_clear(&d);
}

static void a_negative_number_stands_in_parentheses(void **state)
{
    (void)state;
    kent_derivation d = a_bend();
    assert_numbers(&d, 7, KENT_SI, "2*(-2.50000)");
    assert_value(&d, 7, KENT_SI, "-5.00000 kN");
    kent_derivation_clear(&d);
}

static void a_line_without_formula_prints_no_arithmetic(void **state)
{
    (void)state;
    kent_derivation d = a_bend();
    assert_numbers(&d, 0, KENT_SI, "");
    assert_numbers(&d, 1, KENT_SI, "");
    kent_derivation_clear(&d);
}

/* The whole name is replaced, never a part of one. */
static void the_longest_name_is_the_symbol(void **state)
{
    (void)state;
    kent_derivation d = {0};
    kent_derivation_put(&d, "p", 1e3, KENT_PRESSURE, KENT_GIVEN, "");
    kent_derivation_put(&d, "p_1", 2e3, KENT_PRESSURE, KENT_GIVEN, "");
    kent_derivation_put(&d, "p_1'", 3e3, KENT_PRESSURE, KENT_GIVEN, "");
    kent_derivation_work(&d, "x", 6e3, KENT_PRESSURE, "p+p_1+p_1'", "", "");
    assert_numbers(&d, 3, KENT_SI, "1.00000+2.00000+3.00000");
    kent_derivation_clear(&d);
}

static void a_function_or_an_exponent_is_no_symbol(void **state)
{
    (void)state;
    kent_derivation d = {0};
    kent_derivation_put(&d, "e3", 7.0, KENT_RATIO, KENT_GIVEN, "");
    kent_derivation_put(&d, "n", 7.0, KENT_RATIO, KENT_GIVEN, "");
    kent_derivation_work(&d, "x", 7000.0, KENT_RATIO, "min(n, e3)*1e3", "", "");
    assert_numbers(&d, 2, KENT_SI, "min(7.00000, 7.00000)*1e3");
    kent_derivation_clear(&d);
}

static void a_later_line_hides_an_earlier_one_of_its_name(void **state)
{
    (void)state;
    kent_derivation d = {0};
    kent_derivation_put(&d, "p", 1e3, KENT_PRESSURE, KENT_GIVEN, "");
    kent_derivation_work(&d, "p", 2e3, KENT_PRESSURE, "2*p", "", "");
    kent_derivation_work(&d, "q", 4e3, KENT_PRESSURE, "2*p", "", "");
    assert_numbers(&d, 1, KENT_SI, "2*1.00000");
    assert_numbers(&d, 2, KENT_SI, "2*2.00000");
    assert_ptr_equal(kent_derivation_find(&d, "p"), &d.lines[1]);
    assert_null(kent_derivation_find(&d, "z"));
    kent_derivation_clear(&d);
}

static void six_significant_digits_are_printed_always(void **state)
{
    (void)state;
    static const struct {
        double value;
        const char *printed;
    } ROWS[] = {
        {0.0, "0"},
        {1.0, "1.00000"},
        {-0.5, "-0.500000"},
        {123456.0, "123456"},
        {1234567.0, "1.23457e6"},
        {1.5e-7, "1.50000e-7"},
        {0.001, "0.00100000"},
        {99999.99, "100000"},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        kent_derivation d = {0};
        kent_derivation_put(&d, "x", ROWS[i].value, KENT_RATIO, KENT_GIVEN, "");
        assert_value(&d, 0, KENT_SI, ROWS[i].printed);
        kent_derivation_clear(&d);
    }
}

/* slug = lbf s2/ft, so that rho Q V comes out in lbf without a factor. */
static void the_coherent_sets_need_no_conversion_factor(void **state)
{
    (void)state;
    kent_derivation d = {0};
    const double rho = 998.0, q = 0.3, v = 1.7, g = 9.80665, z = 12.0;

    kent_derivation_put(&d, "rho", rho, KENT_DENSITY, KENT_GIVEN, "");
    kent_derivation_put(&d, "Q", q, KENT_FLOW, KENT_GIVEN, "");
    kent_derivation_put(&d, "V", v, KENT_SPEED, KENT_GIVEN, "");
    kent_derivation_put(&d, "g", g, KENT_ACCELERATION, KENT_GIVEN, "");
    kent_derivation_put(&d, "z", z, KENT_LENGTH, KENT_GIVEN, "");
    kent_derivation_work(&d, "F", rho * q * v, KENT_FORCE, "rho*Q*V", "", "");
    kent_derivation_work(&d, "p", rho * g * z, KENT_PRESSURE, "rho*g*z", "", "");
    kent_derivation_work(&d, "w", rho * g, KENT_UNIT_WEIGHT, "rho*g", "", "");
    kent_derivation_work(&d, "s", rho * g * z, KENT_STRESS, "w*z", "", "");
    kent_derivation_work(&d, "f", rho * g * z * z, KENT_FORCE_PER_LENGTH, "p*z", "",
                         "");
    kent_derivation_work(&d, "B", z * z * z, KENT_VOLUME, "z^3", "", "");
    kent_derivation_work(&d, "t", z / v, KENT_TIME, "z/V", "", "");
    kent_derivation_work(&d, "mu", rho * v * z, KENT_VISCOSITY, "rho*V*z", "", "");
    for (int system = KENT_SI; system <= KENT_US; system++) {
        for (size_t i = 5; i < d.count; i++) {
            char numbers[TEXT], value[TEXT], error[TEXT] = "";
            kent_line_numbers(&d, i, (kent_system)system, numbers, sizeof numbers);
            kent_line_value(&d.lines[i], (kent_system)system, value, sizeof value);
            if (!kent_arith_agrees(numbers, value, error, sizeof error)) {
                fail_msg("%s: %s", d.lines[i].symbol, error);
            }
        }
    }
    kent_derivation_clear(&d);
}

static void units_of_the_coherent_sets_are_named(void **state)
{
    (void)state;
    kent_derivation d = a_bend();
    assert_string_equal(kent_coherent_unit(KENT_PRESSURE, KENT_US), "lbf/ft2");
    assert_string_equal(kent_coherent_unit(KENT_DENSITY, KENT_SI), "t/m3");
    assert_string_equal(kent_coherent_unit(KENT_ANGLE, KENT_US), "deg");
    assert_value(&d, 3, KENT_SI, "22.5000 deg");
    assert_value(&d, 5, KENT_US, "39446.2 lbf"); /* 175.465 kN / 4.4482216 N */
    for (int kind = 0; kind < KENT_KIND_COUNT;
         kind++) { /* every kind is in the table */
        const bool bare = kind == KENT_RATIO;
        const char *si = kent_coherent_unit((kent_kind)kind, KENT_SI);
        const char *us = kent_coherent_unit((kent_kind)kind, KENT_US);
        assert_int_equal(si[0] == '\0', bare);
        assert_int_equal(us[0] == '\0', bare);
    }
    kent_derivation_clear(&d);
}

static void text_that_does_not_fit_is_cut_not_overrun(void **state)
{
    (void)state;
    kent_derivation d = a_bend();
    char small[10];
    kent_line_numbers(&d, 5, KENT_SI, small, sizeof small);
    assert_true(strlen(small) < sizeof small);
    kent_line_value(&d.lines[5], KENT_SI, small, 4);
    assert_string_equal(small, "175");
    kent_derivation_clear(&d);
}

/* ---- the judge itself ------------------------------------------------------------ */

static void assert_between(const char *text, double lo, double hi)
{
    kent_interval got = {0.0, 0.0};
    char error[TEXT] = "";
    if (!kent_arith_evaluate(text, &got, error, sizeof error)) fail_msg("%s", error);
    assert_within(got.lo, lo, 1e-9 * (1.0 + fabs(lo)));
    assert_within(got.hi, hi, 1e-9 * (1.0 + fabs(hi)));
}

static void short_numbers_are_exact_and_long_ones_rounded(void **state)
{
    (void)state;
    assert_between("2", 2.0, 2.0);
    assert_between("0.5", 0.5, 0.5);
    assert_between("2.00000", 1.999995, 2.000005);
    assert_between("123456", 123455.5, 123456.5);
    assert_between("1.23457e6", 1234565.0, 1234575.0);
    assert_between("2*3.00000", 5.99999, 6.00001);
}

static void arithmetic_follows_the_usual_order(void **state)
{
    (void)state;
    assert_between("1+2*3", 7.0, 7.0);
    assert_between("(1+2)*3", 9.0, 9.0);
    assert_between("8-4-2", 2.0, 2.0);
    assert_between("8/4/2", 1.0, 1.0);
    assert_between("2^3^2", 512.0, 512.0);
    assert_between("-2^2", -4.0, -4.0);
    assert_between("(-2)^2", 4.0, 4.0);
    assert_between("2^-1", 0.5, 0.5);
    assert_between("-(1 - 3)*0.5", 1.0, 1.0);
    assert_between("max(1, 5, 3) - min(4, 2)", 3.0, 3.0);
    assert_between("ceil(2.1) + abs(-3) + sqrt(16)", 10.0, 10.0);
    assert_between("sin(30deg) + cos(60deg) + tan(45deg)", 2.0, 2.0);
    assert_between("sin(90.0000deg)", 1.0 - 3.9e-15, 1.0);
    assert_between("pi/4*2^2", 3.14159265358979, 3.14159265358979);
}

static void a_wrong_result_is_caught(void **state)
{
    (void)state;
    char error[TEXT];
    assert_true(kent_arith_agrees("2*3.00000", "6.00000 kN", error, sizeof error));
    assert_true(kent_arith_agrees("-2*3.00000", "-6.00000 kN", error, sizeof error));
    assert_false(kent_arith_agrees("2*3.00000", "6.00002 kN", error, sizeof error));
    assert_false(kent_arith_agrees("2*3.00000", "-6.00000 kN", error, sizeof error));
    assert_non_null(strstr(error, "-6.00000"));
}

static void what_is_no_arithmetic_is_refused(void **state)
{
    (void)state;
    static const char *const BAD[] = {
        "",    "1+",  "(1",       "1)",   "1 2",      "x",          "sin 3",
        "1/0", "1,2", "sqrt(-1)", "2**3", "sin(1,2)", "tan(90deg)", "p_1*3"};
    for (size_t i = 0; i < sizeof BAD / sizeof BAD[0]; i++) {
        kent_interval out = {0.0, 0.0};
        char error[TEXT] = "";
        if (kent_arith_evaluate(BAD[i], &out, error, sizeof error)) {
            fail_msg("'%s' was taken for arithmetic", BAD[i]);
        }
        assert_true(error[0] != '\0');
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(symbols_become_their_printed_digits),
        cmocka_unit_test(a_negative_number_stands_in_parentheses),
        cmocka_unit_test(a_line_without_formula_prints_no_arithmetic),
        cmocka_unit_test(the_longest_name_is_the_symbol),
        cmocka_unit_test(a_function_or_an_exponent_is_no_symbol),
        cmocka_unit_test(a_later_line_hides_an_earlier_one_of_its_name),
        cmocka_unit_test(six_significant_digits_are_printed_always),
        cmocka_unit_test(the_coherent_sets_need_no_conversion_factor),
        cmocka_unit_test(units_of_the_coherent_sets_are_named),
        cmocka_unit_test(text_that_does_not_fit_is_cut_not_overrun),
        cmocka_unit_test(short_numbers_are_exact_and_long_ones_rounded),
        cmocka_unit_test(arithmetic_follows_the_usual_order),
        cmocka_unit_test(a_wrong_result_is_caught),
        cmocka_unit_test(what_is_no_arithmetic_is_refused),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
