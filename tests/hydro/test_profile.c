#include "kent_profile.h"
#include "kent_check.h"

/* Cengel and Cimbala, Fluid Mechanics, ex. 6-1, p. 248 */
static void laminar_flow_carries_a_third_more_momentum(void **state)
{
    (void)state;
    assert_close(kent_momentum_factor(500.0, 64.0 / 500.0), 4.0 / 3.0, 1e-15);
    assert_close(kent_momentum_factor(2000.0, 0.032), 4.0 / 3.0, 1e-15);
    assert_close(kent_energy_factor(500.0, 64.0 / 500.0), 2.0, 1e-15);
}

/* 1 + 0.98 f and 1 + 2.7 f (from memory) */
static void turbulent_flow_follows_the_friction_factor(void **state)
{
    (void)state;
    assert_close(kent_momentum_factor(1e5, 0.02), 1.0196, 1e-15);
    assert_close(kent_energy_factor(1e5, 0.02), 1.0540, 1e-15);
}

/* Logarithmic profile, kappa 0.40, at f = 0.02: 1.01953 and 1.05420, worked out apart
 */
static void they_agree_with_the_logarithmic_profile(void **state)
{
    (void)state;
    assert_within(kent_momentum_factor(1e5, 0.02), 1.01953, 1e-4);
    assert_within(kent_energy_factor(1e5, 0.02), 1.05420, 3e-4);
}

static void between_them_lies_a_straight_line(void **state)
{
    (void)state;
    assert_close(kent_momentum_factor(3000.0, 0.04), 0.5 * (4.0 / 3.0 + 1.0392), 1e-15);
    assert_close(kent_energy_factor(3000.0, 0.04), 0.5 * (2.0 + 1.108), 1e-15);
    assert_close(kent_momentum_factor(4000.0, 0.04), 1.0392, 1e-15);
}

/* Closed form, worked out apart from the program */
static void power_law_profiles(void **state)
{
    (void)state;
    const double rows[][4] = {{6, .79121, 1.02691, 1.07678},
                              {7, .81667, 1.02041, 1.05838},
                              {8, .83660, 1.01602, 1.04594},
                              {10, .86580, 1.01063, 1.03063}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        double mean = 0.0, momentum = 0.0, energy = 0.0;
        kent_power_profile(rows[i][0], &mean, &momentum, &energy);
        assert_within(mean, rows[i][1], 1e-5);
        assert_within(momentum, rows[i][2], 1e-5);
        assert_within(energy, rows[i][3], 1e-5);
    }
}

static void a_flat_profile_has_factors_of_one(void **state)
{
    (void)state;
    double mean = 0.0, momentum = 0.0, energy = 0.0;
    kent_power_profile(1e9, &mean, &momentum, &energy);
    assert_close(mean, 1.0, 1e-8);
    assert_close(momentum, 1.0, 1e-8);
    assert_close(energy, 1.0, 1e-8);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(laminar_flow_carries_a_third_more_momentum),
        cmocka_unit_test(turbulent_flow_follows_the_friction_factor),
        cmocka_unit_test(they_agree_with_the_logarithmic_profile),
        cmocka_unit_test(between_them_lies_a_straight_line),
        cmocka_unit_test(power_law_profiles),
        cmocka_unit_test(a_flat_profile_has_factors_of_one),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
