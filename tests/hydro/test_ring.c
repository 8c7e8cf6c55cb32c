#include "kent_check.h"
#include "kent_ring.h"

#include <math.h>

/* Steel of 30e6 psi and 0.3: 66e6 psi (t/D)^3 (AWWA M11, from memory); psi throughout,
 * as only ratios enter. */
static void steel_buckles_at_what_the_handbook_has(void **state)
{
    (void)state;
    assert_close(kent_ring_collapse(30e6, 0.3, 1.0, 100.0), 66e6 * 1e-6, 2e-3);
    assert_close(kent_ring_collapse(30e6, 0.3, 0.25, 60.0), 66e6 * pow(0.25 / 60.0, 3),
                 2e-3);
}

/* S. P. Timoshenko and J. M. Gere, Theory of Elastic Stability, 2nd ed., 1961: 3 E I /
 * ((1 - nu^2) R^3) with I = t^3/12 per length. */
static void it_is_the_ring_of_the_theory_of_stability(void **state)
{
    (void)state;
    for (int i = 1; i <= 40; i++) {
        const double wall = 1e-3 * i, radius = 0.3 + 0.01 * i, e = 1e9, nu = 0.45;
        const double inertia = wall * wall * wall / 12.0;
        const double want = 3.0 * e * inertia / ((1.0 - nu * nu) * pow(radius, 3));
        assert_close(kent_ring_collapse(e, nu, wall, 2.0 * radius), want, 1e-12);
    }
}

/* Plastics Pipe Institute, Handbook of PE Pipe, chapter 6 (from memory): 2 E/(1 - nu^2)
 * (1/(DR - 1))^3; DR is outside diameter over wall. */
static void pipe_of_one_diameter_ratio_buckles_alike(void **state)
{
    (void)state;
    const double ratio[] = {11.0, 17.0, 26.0, 41.0};
    for (int i = 0; i < 4; i++) {
        const double outside = 0.4, wall = outside / ratio[i];
        const double want = 2.0 * 8e8 / (1.0 - 0.45 * 0.45) / pow(ratio[i] - 1.0, 3);
        assert_close(kent_ring_collapse(8e8, 0.45, wall, outside - wall), want, 1e-12);
    }
    assert_true(isnan(kent_ring_collapse(8e8, 0.45, (double)NAN, 0.4)));
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(steel_buckles_at_what_the_handbook_has),
        cmocka_unit_test(it_is_the_ring_of_the_theory_of_stability),
        cmocka_unit_test(pipe_of_one_diameter_ratio_buckles_alike),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
