#include "kent_math.h"
#include "kent_check.h"

#include <float.h>
#include <math.h>
#include <stdint.h>

enum { TRIALS = 200000 };

/* Uniform in 0 .. 1, the same in every run (Knuth's 64-bit congruential generator). */
static double random_fraction(uint64_t *seed)
{
    *seed = *seed * UINT64_C(6364136223846793005) + UINT64_C(1442695040888963407);
    return (double)(*seed >> 11) * 0x1p-53;
}

/* Positive numbers of every size, and close to 1. */
static double random_argument(uint64_t *seed, int trial)
{
    const double widths[] = {1400.0, 10.0, 1e-3, 1e-9};
    return exp((random_fraction(seed) - 0.5) * widths[trial % 4]);
}

static double last_place(double x) { return nextafter(fabs(x), INFINITY) - fabs(x); }

static void the_logarithm_is_within_two_last_places(void **state)
{
    (void)state;
    uint64_t seed = 1;
    for (int i = 0; i < TRIALS; i++) {
        const double x = random_argument(&seed, i);
        const double want = log(x); /* itself within one */
        assert_within(kent_log(x), want, 2.0 * last_place(want));
    }
}

static void the_logarithm_of_one_is_exactly_nil(void **state)
{
    (void)state;
    assert_true(kent_log(1.0) == 0.0);
    assert_close(kent_log(2.0), 0.69314718055994530942, 1e-16);
    assert_close(kent_log(DBL_MIN), log(DBL_MIN), 3e-16);
    assert_close(kent_log(DBL_MAX), log(DBL_MAX), 3e-16);
}

static void odd_arguments_go_to_the_library(void **state)
{
    (void)state;
    assert_true(isinf(kent_log(0.0)) && kent_log(0.0) < 0.0);
    assert_true(isnan(kent_log(-1.0)));
    assert_true(isnan(kent_log(NAN)));
    assert_true(isinf(kent_log(INFINITY)));
    assert_close(kent_log(5e-324), log(5e-324), 1e-15);
    assert_true(isnan(kent_pow(-2.0, 0.5)));
    assert_true(kent_pow(0.0, 2.0) == 0.0);
    assert_true(isinf(kent_pow(1e300, 2.0)));
}

static void powers_are_within_1e_14(void **state)
{
    (void)state;
    uint64_t seed = 7;
    for (int i = 0; i < TRIALS; i++) {
        const double x = random_argument(&seed, i);
        const double largest = fmin(1e12, 699.0 / fmax(fabs(log(x)), 1e-30));
        const double span = i % 3 == 0 ? largest : fmin(largest, 5.0);
        const double y = (2.0 * random_fraction(&seed) - 1.0) * span;
        assert_close(kent_pow(x, y), (double)powl((long double)x, (long double)y),
                     1e-14);
    }
}

static void powers_add_up(void **state)
{
    (void)state;
    uint64_t seed = 3;
    for (int i = 0; i < 2000; i++) {
        const double x = exp(4.0 * random_fraction(&seed) - 2.0);
        const double y = 10.0 * random_fraction(&seed);
        assert_close(kent_pow(x, y) * kent_pow(x, -y), 1.0, 3e-14);
        assert_close(kent_pow(x, 2.0), x * x, 1e-14);
        assert_close(kent_pow(x, 0.5), sqrt(x), 1e-14);
    }
    assert_true(kent_pow(3.7, 0.0) == 1.0);
    assert_true(kent_pow(1.0, 123.4) == 1.0);
}

static void angles_are_within_two_last_places(void **state)
{
    (void)state;
    uint64_t seed = 11;
    for (int i = 0; i < TRIALS; i++) {
        const double size = random_argument(&seed, 4 * i + 1);
        const double y = (random_fraction(&seed) < 0.5 ? -1.0 : 1.0) * size;
        const double x = (random_fraction(&seed) < 0.5 ? -1.0 : 1.0) *
                         (i % 2 == 0 ? 1.0 : size * random_argument(&seed, 1));
        const double want = atan2(y, x); /* itself within one */
        assert_within(kent_atan2(y, x), want, 2.0 * last_place(want));
    }
}

static void angles_of_the_axes_are_exact(void **state)
{
    (void)state;
    const double pi = acos(-1.0);
    assert_true(kent_atan2(0.0, 0.0) == 0.0);
    assert_true(kent_atan2(-0.0, -0.0) == 0.0);
    assert_true(kent_atan2(0.0, 3.0) == 0.0);
    assert_true(kent_atan2(2.0, 0.0) == 0.5 * pi);
    assert_true(kent_atan2(-2.0, 0.0) == -0.5 * pi);
    assert_true(kent_atan2(0.0, -1.0) == pi);
    assert_true(kent_atan2(-0.0, -1.0) == -pi);
    assert_true(kent_atan2(7.0, 7.0) == 0.25 * pi);
    assert_true(kent_atan2(7.0, -7.0) == 0.75 * pi);
    assert_true(kent_atan2(INFINITY, 1.0) == 0.5 * pi);
    assert_true(isnan(kent_atan2(NAN, 1.0)) && isnan(kent_atan2(1.0, NAN)));
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_logarithm_is_within_two_last_places),
        cmocka_unit_test(the_logarithm_of_one_is_exactly_nil),
        cmocka_unit_test(odd_arguments_go_to_the_library),
        cmocka_unit_test(powers_are_within_1e_14),
        cmocka_unit_test(powers_add_up),
        cmocka_unit_test(angles_are_within_two_last_places),
        cmocka_unit_test(angles_of_the_axes_are_exact),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
