/* Earth pressure by Rankine against worked examples. */
#include "kent_check.h"
#include "kent_restraint.h"

static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

/* Das, B. M., Principles of Geotechnical Engineering, example 13.2, p 449: a wall of
 * 6 m, 16 kN/m3, 36 degrees: Pa 74.8, Pp 1109.3 kN/m, Kp 3.8518. */
static void a_six_metre_wall_has_the_thrusts_of_the_textbook(void **state)
{
    (void)state;
    const double half = 0.5 * 16e3 * 6.0 * 6.0; /* N/m: triangle of pressure */

    assert_close(kent_rankine_passive(36.0 * DEGREE), 3.8518, 5e-5);
    assert_close(half * kent_rankine_active(36.0 * DEGREE), 74.8e3, 5e-4);
    assert_close(half * kent_rankine_passive(36.0 * DEGREE), 1109.3e3, 5e-4);
}

/* Das, B. M., Principles of Foundation Engineering, example 7.7, p 342: 30 degrees
 * above, 26 degrees and 10 kPa below; effective stress 31.44 kPa at the boundary, 9.05
 * kPa more at the base: 94.32, 112.53, 135.70 kPa. */
static void passive_pressure_jumps_where_the_soil_changes(void **state)
{
    (void)state;
    assert_close(kent_passive_pressure(30.0 * DEGREE, 0.0, 31.44e3), 94.32e3, 1e-4);
    assert_close(kent_passive_pressure(26.0 * DEGREE, 10e3, 31.44e3), 112.53e3, 1e-4);
    assert_close(kent_passive_pressure(26.0 * DEGREE, 10e3, 40.49e3), 135.70e3, 1e-4);
}

/* tan(45 + phi/2)^2, another form of the same (Rankine, W. J. M., On the stability of
 * loose earth, 1857), to five figures. */
static void the_passive_coefficient_follows_the_table_of_angles(void **state)
{
    (void)state;
    static const double table[][2] = {
        {20.0, 2.0396}, {25.0, 2.4639}, {30.0, 3.0000}, {35.0, 3.6902}, {40.0, 4.5989}};

    for (size_t i = 0; i < sizeof table / sizeof table[0]; i++) {
        assert_within(kent_rankine_passive(table[i][0] * DEGREE), table[i][1], 1e-4);
    }
}

static void active_and_passive_are_each_other_s_reciprocal(void **state)
{
    (void)state;
    for (int i = 0; i <= 45; i++) {
        const double phi = i * DEGREE;
        assert_close(kent_rankine_active(phi) * kent_rankine_passive(phi), 1.0, 1e-14);
        const double root = tan(45.0 * DEGREE + 0.5 * phi);
        assert_close(kent_rankine_passive(phi), root * root, 1e-13);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_six_metre_wall_has_the_thrusts_of_the_textbook),
        cmocka_unit_test(passive_pressure_jumps_where_the_soil_changes),
        cmocka_unit_test(the_passive_coefficient_follows_the_table_of_angles),
        cmocka_unit_test(active_and_passive_are_each_other_s_reciprocal),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
