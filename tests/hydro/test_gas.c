#include "kent_check.h"
#include "kent_gas.h"

#include <math.h>

/* Boyle's law, and a table value of the adiabatic: 2^1.4 = 2.639 (any handbook). */
static void halving_the_volume_doubles_the_pressure_or_more(void **state)
{
    (void)state;
    const kent_gas slow = {2e5, 3.0, 1.0}, fast = {2e5, 3.0, 1.4};
    assert_close(kent_gas_in(&slow, 1.5).pressure, 4e5, 1e-13);
    assert_close(kent_gas_in(&fast, 1.5).pressure, 2e5 * 2.639, 1e-4);
    assert_close(kent_gas_in(&fast, 3.0).pressure, 2e5, 1e-13);
}

/* Work on it from 3 to 1 m3 by Simpson's rule against p0 V0 ln(V0/V), and
 * (p V - p0 V0)/(n - 1). */
static void its_work_is_that_of_the_closed_forms(void **state)
{
    (void)state;
    const double exponent[] = {1.0, 1.2, 1.4};
    for (int i = 0; i < 3; i++) {
        const kent_gas gas = {2e5, 3.0, exponent[i]};
        const double n = gas.exponent;
        double sum = 0.0;
        for (int k = 0; k <= 2000; k++) {
            const double weight = k == 0 || k == 2000 ? 1.0 : k % 2 == 1 ? 4.0 : 2.0;
            sum += weight * kent_gas_in(&gas, 3.0 - 0.001 * k).pressure;
        }
        const double end = kent_gas_in(&gas, 1.0).pressure;
        const double work =
            n > 1.0 ? (end * 1.0 - 2e5 * 3.0) / (n - 1.0) : 6e5 * log(3.0);
        assert_close(sum * 0.001 / 3.0, work, 1e-9);
    }
}

static void its_slope_is_the_difference_and_it_never_ends(void **state)
{
    (void)state;
    const kent_gas gas = {2e5, 3.0, 1.2};
    double last = INFINITY;
    for (int i = -40; i < 400; i++) {
        const double volume = 0.01 * i * 1.003 + 0.0011, by = 1e-7;
        const kent_gas_point at = kent_gas_in(&gas, volume);
        const double slope = (kent_gas_in(&gas, volume + by).pressure -
                              kent_gas_in(&gas, volume - by).pressure) /
                             (2.0 * by);
        assert_true(isfinite(at.pressure) && at.pressure < last);
        assert_close(at.by_volume, slope, 1e-3);
        last = at.pressure;
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(halving_the_volume_doubles_the_pressure_or_more),
        cmocka_unit_test(its_work_is_that_of_the_closed_forms),
        cmocka_unit_test(its_slope_is_the_difference_and_it_never_ends),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
