#include "kent_water.h"
#include "kent_check.h"

#include <math.h>
#include <stdbool.h>

/* Values of IAPWS-95 with the viscosity of IAPWS R12-08 at 101.325 kPa: another
 * formulation than the one programmed, worked out with a general-purpose library. */
static void water_at_everyday_temperatures(void **state)
{
    (void)state;
    const double rows[][6] = {
        /* degC, kg/m3, mPa s, kPa, m/s, GPa */
        {5, 999.967, 1.51817, 0.87257, 1426.17, 2.0339},
        {10, 999.703, 1.30590, 1.22818, 1447.27, 2.0940},
        {15, 999.103, 1.13757, 1.70574, 1465.93, 2.1470},
        {25, 997.048, 0.89002, 3.16975, 1496.70, 2.2335},
        {40, 992.216, 0.65273, 7.38443, 1528.90, 2.3194},
    };
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        const kent_water w = kent_water_at(rows[i][0] + 273.15);
        assert_close(w.temperature, rows[i][0] + 273.15, 1e-15);
        assert_close(w.density, rows[i][1], 2e-4);
        assert_close(w.viscosity, rows[i][2] * 1e-3, 5e-3);
        assert_close(w.vapour_pressure, rows[i][3] * 1e3, 2e-3);
        assert_close(w.sound_speed, rows[i][4], 1e-3);
        assert_close(w.bulk_modulus, rows[i][5] * 1e9, 2e-3);
    }
}

/* IAPWS SR6-08, verification values at 298.15 K and 0.1 MPa (from memory, and equal to
 * a general-purpose library's) */
static void verification_values_at_25_degrees(void **state)
{
    (void)state;
    const kent_water w = kent_water_at(298.15);
    assert_within(w.density, 997.047013, 5e-7);
    assert_within(w.sound_speed, 1496.69922, 5e-6);
    assert_within(w.viscosity, 8.89996774e-4, 5e-13);
}

/* IAPWS R7-97, table 35, at 300 K (from memory, and equal to a library's) */
static void verification_value_of_vapour_pressure(void **state)
{
    (void)state;
    assert_within(kent_water_at(300.0).vapour_pressure, 3.53658941e3, 5e-6);
}

/* IAPWS R7-97, region 1 at 300 K and 3 MPa: 1.00215168e-3 m3/kg; R12-08 at 298.15 K and
 * 998 kg/m3: 889.735100 uPa s (from memory, and equal to a library's). The program's
 * water is that of 0.1 MPa: 2.9 MPa is taken off by its own modulus, and 1 kg/m3 moves
 * viscosity by less than 0.05 %. */
static void its_density_and_viscosity_meet_the_other_releases(void **state)
{
    (void)state;
    const kent_water w = kent_water_at(300.0);
    assert_close(w.density * (1.0 + 2.9e6 / w.bulk_modulus), 1.0 / 1.00215168e-3, 3e-5);
    assert_close(kent_water_at(298.15).viscosity, 889.735100e-6, 5e-4);
}

static void the_modulus_is_the_adiabatic_one(void **state)
{
    (void)state;
    for (int i = 0; i <= 20; i++) {
        const kent_water w = kent_water_at(KENT_WATER_COLDEST + 5.0 * i);
        assert_close(w.bulk_modulus, w.density * w.sound_speed * w.sound_speed, 1e-14);
    }
}

static void water_is_densest_at_four_degrees_and_boils_at_one_atmosphere(void **state)
{
    (void)state;
    const double four = kent_water_at(277.13).density;
    assert_true(four > kent_water_at(276.5).density);
    assert_true(four > kent_water_at(277.7).density);
    assert_close(kent_water_at(373.124).vapour_pressure, 101325.0, 1e-3);
    for (int i = 0; i < 99; i++) {
        const double t = KENT_WATER_COLDEST + i;
        assert_true(kent_water_at(t + 1.0).vapour_pressure >
                    kent_water_at(t).vapour_pressure);
        assert_true(kent_water_at(t + 1.0).viscosity < kent_water_at(t).viscosity);
    }
}

static void outside_its_range_there_is_no_number(void **state)
{
    (void)state;
    const double outside[] = {273.14, 373.16, -5.0, INFINITY, NAN};
    for (size_t i = 0; i < sizeof outside / sizeof outside[0]; i++) {
        const kent_water w = kent_water_at(outside[i]);
        assert_true(isnan(w.temperature) && isnan(w.density) && isnan(w.bulk_modulus));
        assert_true(isnan(w.viscosity) && isnan(w.vapour_pressure) &&
                    isnan(w.sound_speed));
    }
    assert_true(isfinite(kent_water_at(KENT_WATER_COLDEST).density));
    assert_true(isfinite(kent_water_at(KENT_WATER_HOTTEST).density));
    assert_true(isnan(kent_barometric_pressure(-501.0)));
    assert_true(isnan(kent_barometric_pressure(11001.0)));
    assert_true(isnan(kent_barometric_pressure(NAN)));
}

/* ISO 2533:1975, pressure by geometric altitude (table values from memory) */
static void air_gets_thinner_as_in_the_standard_atmosphere(void **state)
{
    (void)state;
    assert_close(kent_barometric_pressure(0.0), 101325.0, 1e-15);
    assert_within(kent_barometric_pressure(1000.0), 89876.0, 1.0);
    assert_within(kent_barometric_pressure(5000.0), 54048.0, 1.0);
    assert_within(kent_barometric_pressure(10000.0), 26500.0, 1.0);
    assert_true(kent_barometric_pressure(-500.0) > 107000.0);
    /* Near the ground, rho g of air at 15 degC: 1.225 kg/m3. */
    assert_close(101325.0 - kent_barometric_pressure(1.0), 1.225 * 9.80665, 1e-3);
}

/* At 15 degC and sea level water boils (1705.74 - 101325)/(999.103 x 9.81) m above
 * itself, gauge. */
static void the_vapour_limit_is_ten_metres_below_the_pipe(void **state)
{
    (void)state;
    const kent_water w = kent_water_at(288.15);
    const double head = kent_vapour_head(&w, 35.0, 101325.0, 9.81);
    assert_within(head, 35.0 - 10.1640, 5e-4);
    assert_close(kent_vapour_head(&w, 36.0, 101325.0, 9.81), head + 1.0, 1e-14);
    assert_true(kent_vapour_head(&w, 35.0, 89876.0, 9.81) > head);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(water_at_everyday_temperatures),
        cmocka_unit_test(verification_values_at_25_degrees),
        cmocka_unit_test(verification_value_of_vapour_pressure),
        cmocka_unit_test(its_density_and_viscosity_meet_the_other_releases),
        cmocka_unit_test(the_modulus_is_the_adiabatic_one),
        cmocka_unit_test(water_is_densest_at_four_degrees_and_boils_at_one_atmosphere),
        cmocka_unit_test(outside_its_range_there_is_no_number),
        cmocka_unit_test(air_gets_thinner_as_in_the_standard_atmosphere),
        cmocka_unit_test(the_vapour_limit_is_ten_metres_below_the_pipe),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
