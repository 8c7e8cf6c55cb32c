#include "kent_air.h"
#include "kent_check.h"

#include <math.h>

static const double ATMOSPHERE = 101325.0, ROOM = 293.15; /* Pa, K */

static kent_air_rate through(double inside)
{
    const kent_orifice hole = {1.0, 1.0, ATMOSPHERE, ROOM};
    return kent_air_through(&hole, inside);
}

/* Choked inflow at 20 degC and 101.325 kPa: 239.2 kg/s per m2, isentropic flow of a
 * gas of 1.4 and 287.05 J/kg K at the speed of sound; worked out apart. */
static void a_choked_orifice_lets_in_239_kg_per_square_metre(void **state)
{
    (void)state;
    for (int i = 1; i <= 52; i++) {
        const kent_air_rate rate = through(0.01 * i * ATMOSPHERE);
        assert_within(rate.mass, 239.2, 0.05);
        assert_close(rate.mass, 239.172364, 1e-8);
        assert_true(rate.by_pressure == 0.0);
    }
}

/* Worked out apart by Mach number, temperature and density in the throat. */
static void it_passes_what_the_throat_carries(void **state)
{
    (void)state;
    static const double in[][2] = {
        {0.6, 236.442214},  {0.7, 222.960170}, {0.8, 195.835346}, {0.9, 147.604821},
        {0.95, 107.457089}, {0.99, 49.132242}, {0.999, 15.612517}};
    static const double out[][2] = {
        {1.001, 15.620330}, {1.01, 49.379940}, {1.05, 110.259032}, {1.1, 155.651005},
        {1.3, 267.685796},  {1.6, 374.679084}, {1.8, 429.805481},  {1.9, 454.427492},
        {2.0, 478.344728},  {5.0, 1195.861820}};
    for (size_t i = 0; i < sizeof in / sizeof *in; i++) {
        assert_close(through(in[i][0] * ATMOSPHERE).mass, in[i][1], 1e-7);
    }
    for (size_t i = 0; i < sizeof out / sizeof *out; i++) {
        assert_close(through(out[i][0] * ATMOSPHERE).mass, -out[i][1], 1e-7);
    }
}

/* Isentropic flow of air by Mach number: ratios of pressures and of areas, NACA
 * Report 1135, 1953 (from memory). */
static void it_follows_the_table_of_isentropic_flow(void **state)
{
    (void)state;
    static const double table[][2] = {{0.93947, 1.0 / 2.0351}, /* Mach 0.3 */
                                      {0.84302, 1.0 / 1.3398}, /* 0.5 */
                                      {0.65602, 1.0 / 1.0382}, /* 0.8 */
                                      {0.5283, 1.0}};          /* 1 */
    const double choked = through(0.3 * ATMOSPHERE).mass;
    for (size_t i = 0; i < sizeof table / sizeof *table; i++) {
        assert_close(through(table[i][0] * ATMOSPHERE).mass / choked, table[i][1],
                     1e-4);
    }
}

static void it_goes_from_one_regime_to_the_next_without_a_jump(void **state)
{
    (void)state;
    const double critical = pow(5.0 / 6.0, 3.5);
    const double limits[] = {critical, 1.0 - 1e-4, 1.0, 1.0 / (1.0 - 1e-4),
                             1.0 / critical};
    for (size_t i = 0; i < sizeof limits / sizeof *limits; i++) {
        const double below = through(limits[i] * ATMOSPHERE * (1.0 - 1e-12)).mass;
        const double above = through(limits[i] * ATMOSPHERE * (1.0 + 1e-12)).mass;
        assert_within(below, above, 1e-6);
    }
    assert_true(through(ATMOSPHERE).mass == 0.0);
}

static void the_rate_never_rises_with_the_pressure_inside(void **state)
{
    (void)state;
    double last = INFINITY;
    for (int i = 1; i < 4000; i++) {
        const double p = 100.0 * i + 0.3, by = 0.01; /* Pa */
        const kent_air_rate rate = through(p);
        const double slope = (through(p + by).mass - through(p - by).mass) / (2.0 * by);
        assert_true(rate.mass <= last && rate.by_pressure <= 0.0);
        assert_within(rate.by_pressure, slope, 1e-5 * (1e-3 + fabs(slope)));
        last = rate.mass;
    }
}

static void each_way_has_an_orifice_of_its_own(void **state)
{
    (void)state;
    const kent_orifice hole = {0.02, 0.003, ATMOSPHERE, ROOM};
    assert_close(kent_air_through(&hole, 0.8 * ATMOSPHERE).mass,
                 0.02 * through(0.8 * ATMOSPHERE).mass, 1e-14);
    assert_close(kent_air_through(&hole, 1.8 * ATMOSPHERE).mass,
                 0.003 * through(1.8 * ATMOSPHERE).mass, 1e-14);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_choked_orifice_lets_in_239_kg_per_square_metre),
        cmocka_unit_test(it_passes_what_the_throat_carries),
        cmocka_unit_test(it_follows_the_table_of_isentropic_flow),
        cmocka_unit_test(it_goes_from_one_regime_to_the_next_without_a_jump),
        cmocka_unit_test(the_rate_never_rises_with_the_pressure_inside),
        cmocka_unit_test(each_way_has_an_orifice_of_its_own),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
