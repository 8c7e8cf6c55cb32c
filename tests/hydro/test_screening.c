/* Hand formulas against worked examples of textbooks, in their own units: with density
 * w/g in lbf s2/ft4 and feet, pressures are in lbf/ft2. */
#include "kent_check.h"
#include "kent_screening.h"

#include <math.h>

static const double PSI = 144.0; /* lbf/ft2 */

/* Moser and Folkman, Buried Pipe Design, example 4.2: PVC DR18, 1311 ft/s, 7 ft/s, at
 * 0.43 psi for a foot of water: 122 psi. */
static void pvc_of_a_worked_example(void **state)
{
    (void)state;
    const double density = 0.43 * PSI / 32.17;
    assert_close(kent_screening_sudden(density, 1311.0, 7.0) / PSI, 122.0, 1e-2);
}

/* Surge for 1 ft/s: PVC (AWWA M23, from memory) and PE4710 (Plastics Pipe Institute
 * handbook and AWWA M55, from memory). */
static void plastics_per_foot_per_second(void **state)
{
    (void)state;
    static const struct {
        double wave_speed, psi; /* ft/s */
    } ROWS[] = {{1474.0, 19.8}, {1292.0, 17.4}, {1091.0, 14.7},
                {1203.0, 16.2}, {1069.0, 14.4}, {837.0, 11.3}};
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const double got = kent_screening_sudden(62.4 / 32.2, ROWS[i].wave_speed, 1.0);
        assert_close(got / PSI, ROWS[i].psi, 5e-3);
    }
}

/* New Mexico State University, Soils 456, notes, chapter 8: PVC of 1.66 in, 0.14 in:
 * 63.2 x 0.32 = 20.3 psi for 1 ft/s. */
static void pvc_of_course_notes(void **state)
{
    (void)state;
    const double share = sqrt(4e5 / (4e5 + 294000.0 * 1.66 / 0.14));
    const double got = kent_screening_sudden(62.4 / 32.2, 4700.0 * share, 1.0);
    assert_close(got / PSI, 20.3, 2e-3);
}

/* Subramanya, 1000 Solved Problems in Fluid Mechanics, example 14.18: 800 m, 1080.55
 * m/s, 3.0 m/s, shut in 1.25 s and in 2.0 s. */
static void fast_and_slow_closure_of_a_worked_example(void **state)
{
    (void)state;
    const double sudden = kent_screening_sudden(998.0, 1080.55, 3.0);
    const double back = 2.0 * 800.0 / 1080.55;
    assert_close(kent_screening_linear(sudden, back, 1.25), 3.235e6, 2e-3);
    assert_close(kent_screening_linear(sudden, back, 2.0), 2.394e6, 2e-3);
    assert_close(kent_screening_linear(sudden, back, back), sudden, 1e-15);
}

/* Paradise, Problems in Hydraulics, example 6.6: steel of 6 in and 1/4 in, 4240
 * ft/s, 4 ft/s: 228.2 psi, and 2739 psi in the wall. */
static void hoop_stress_of_a_worked_example(void **state)
{
    (void)state;
    const double psi = kent_screening_sudden(62.4 / 32.2, 4240.0, 4.0) / PSI;
    assert_close(psi, 228.2, 1e-3);
    assert_close(psi * 6.0 / (2.0 * 0.25), 2739.0, 1e-3);
}

/* The same, example 6.5: 5000 ft of 24 in carry 18 cusec; the velocity falls as V0 (1 -
 * (t/10)^2), so that at the end it changes by 2 V0/T: 77.1 psi in a rigid column, which
 * is Michaud's figure. An even fall to nil gives half of it: the formula hangs on how.
 */
static void michaud_is_a_rigid_column_at_twice_the_mean_rate(void **state)
{
    (void)state;
    const double velocity = 18.0 / acos(-1.0); /* ft/s in 2 ft */
    const double got = kent_screening_slow(62.4 / 32.2, 5000.0, velocity, 10.0) / PSI;
    assert_close(got, 77.1, 1e-2);
}

/* At the return time Michaud's figure is Joukowsky's. */
static void michaud_meets_the_sudden_one_at_the_return_time(void **state)
{
    (void)state;
    const double back = 2.0 * 700.0 / 1000.0;
    assert_close(kent_screening_slow(998.0, 700.0, 1.3, back),
                 kent_screening_sudden(998.0, 1000.0, 1.3), 1e-14);
}

enum { ROWS = 2001 };

/* An even closure takes its whole time; one by V0 (1 - (t/10)^2) passes 10 % at 10
 * sqrt(0.1) s and 90 % at 10 sqrt(0.9) s; what comes before and after does not count.
 */
static void the_effective_time_is_that_of_the_steep_part(void **state)
{
    (void)state;
    static double time[ROWS], even[ROWS], late[2 * ROWS];
    for (size_t i = 0; i < ROWS; i++) {
        time[i] = 0.01 * (double)i;
        const double t = fmin(1.0, fmax(0.0, (time[i] - 3.0) / 10.0));
        even[i] = 0.2 * (1.0 - t);
        late[2 * i] = -0.2 * (1.0 - t * t); /* against the pipe's direction */
    }
    assert_close(kent_screening_effective_time(time, 1, even, 1, ROWS), 10.0, 1e-9);
    assert_close(kent_screening_effective_time(time, 1, late, 2, ROWS),
                 10.0 * (sqrt(0.9) - sqrt(0.1)) / 0.8, 1e-4);
}

static void what_does_not_change_has_no_effective_time(void **state)
{
    (void)state;
    const double time[] = {0.0, 1.0, 2.0}, flow[] = {0.3, 0.3, 0.3};
    assert_true(isnan(kent_screening_effective_time(time, 1, flow, 1, 3)));
    assert_true(isnan(kent_screening_effective_time(time, 1, flow, 1, 0)));
    const double sudden[] = {0.3, 0.0, 0.0};
    assert_close(kent_screening_effective_time(time, 1, sudden, 1, 3), 1.0, 1e-12);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(pvc_of_a_worked_example),
        cmocka_unit_test(plastics_per_foot_per_second),
        cmocka_unit_test(pvc_of_course_notes),
        cmocka_unit_test(fast_and_slow_closure_of_a_worked_example),
        cmocka_unit_test(hoop_stress_of_a_worked_example),
        cmocka_unit_test(michaud_is_a_rigid_column_at_twice_the_mean_rate),
        cmocka_unit_test(michaud_meets_the_sudden_one_at_the_return_time),
        cmocka_unit_test(the_effective_time_is_that_of_the_steep_part),
        cmocka_unit_test(what_does_not_change_has_no_effective_time),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
