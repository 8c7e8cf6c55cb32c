/* Earth pressure with friction on the face, on slopes, and over a whole face. */
#include "kent_check.h"
#include "kent_earth.h"
#include "kent_restraint.h"

#include <math.h>

static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

/* Coulomb 1776 as in Das, B. M., Principles of Geotechnical Engineering, chapter 13,
 * upright face, level ground; worked out apart from this program. */
static void coulombs_coefficient_is_the_textbooks(void **state)
{
    (void)state;
    static const struct {
        double phi, delta, passive; /* degrees */
    } rows[] = {{30.0, 10.0, 4.143},
                {30.0, 20.0, 6.105},
                {35.0, 15.0, 6.555},
                {25.0, 10.0, 3.285}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        const double phi = rows[i].phi * DEGREE, delta = rows[i].delta * DEGREE;
        assert_within(kent_coulomb_passive(phi, delta), rows[i].passive, 1e-3);
        assert_close(kent_falling_passive(phi, delta, 0.0),
                     kent_coulomb_passive(phi, delta) * cos(delta), 1e-12);
    }
}

/* Without friction on the face it is Rankine's (1857); with it, more. */
static void without_wall_friction_coulomb_is_rankine(void **state)
{
    (void)state;
    for (int phi = 0; phi <= 44; phi += 4) {
        const double angle = phi * DEGREE;
        assert_close(kent_coulomb_passive(angle, 0.0), kent_rankine_passive(angle),
                     1e-12);
        if (phi == 0) continue;
        assert_true(kent_falling_passive(angle, 0.5 * angle, 0.0) >
                    kent_rankine_passive(angle));
    }
    assert_close(kent_coulomb_limit(0.6), 0.2, 1e-15);
}

/* Ground that falls at 10 degrees before soil of 30, by hand: sin 30 sin 20/cos 10 =
 * 0.17365, its root 0.41671, 0.75/0.58329^2 = 2.2044. */
static void falling_ground_gives_less_the_steeper_it_falls(void **state)
{
    (void)state;
    const double phi = 30.0 * DEGREE;
    double last = kent_rankine_passive(phi);

    assert_within(kent_falling_passive(phi, 0.0, 10.0 * DEGREE), 2.2044, 1e-4);
    for (int falls = 1; falls < 30; falls++) {
        const double here = kent_falling_passive(phi, 0.0, falls * DEGREE);
        assert_true(here < last);
        last = here;
    }
    assert_within(last, cos(phi) * cos(phi), 0.3); /* towards cos^2 phi, at phi */
    assert_true(isnan(kent_falling_passive(phi, 0.0, phi)));
    assert_true(isnan(kent_falling_passive(phi, 0.0, 31.0 * DEGREE)));
    assert_true(isnan(kent_falling_passive(0.0, 0.0, 1.0 * DEGREE)));
    assert_true(isnan(kent_falling_passive(50.0 * DEGREE, 50.0 * DEGREE, 0.0)));
}

/* The plane is the one that gives least of all (Coulomb 1776): searched for by the
 * triangle of forces, every thousandth of a degree. Without friction 45 - phi/2. */
static void the_plane_of_failure_is_the_one_that_gives_least(void **state)
{
    (void)state;
    static const double rows[][2] = {
        {30.0, 10.0}, {30.0, 20.0}, {36.0, 12.0}, {25.0, 25.0}, {18.0, 6.0}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        const double phi = rows[i][0] * DEGREE, delta = rows[i][1] * DEGREE;
        double least = INFINITY, at = 0.0;
        for (int k = 1; k < 60000; k++) {
            const double a = 1e-3 * k * DEGREE;
            const double down = cos(delta) / tan(a + phi) - sin(delta);
            if (!(down > 0.0)) break;
            const double push = 1.0 / tan(a) / down; /* of gamma H2/2 */
            if (push < least) at = a;
            least = fmin(least, push);
        }
        assert_within(kent_passive_plane(phi, delta) / DEGREE, at / DEGREE, 0.01);
        assert_close(least, kent_coulomb_passive(phi, delta), 1e-6);
        assert_close(kent_passive_plane(phi, 0.0) / DEGREE, 45.0 - 0.5 * rows[i][0],
                     1e-12);
        assert_close(kent_passive_plane(phi, 1e-9), kent_passive_plane(phi, 0.0), 1e-6);
    }
    assert_close(kent_passive_plane(0.0, 0.0), 45.0 * DEGREE, 1e-12);
}

/* A design sheet whose arithmetic holds: 19.2 kN/m3, 30 degrees, a block from 0.598 m
 * to 2.098 m: 116.47 and 12.94 kN/m; with 37.82 kN of friction against 77.0 kN a factor
 * of 1.84. Das, Principles of Geotechnical Engineering, example 13.2 p 449: 16 kN/m3,
 * 36 degrees, 6 m: 74.8 and 1109.3 kN/m. */
static void a_face_finds_the_area_under_the_pressure(void **state)
{
    (void)state;
    const kent_earth sheet = {19.2e3, 30.0 * DEGREE, 0.0, (double)INFINITY, 9.81e3};
    const double passive = kent_face_passive(&sheet, 0.598, 2.098);
    const double active = kent_face_active(&sheet, 0.598, 2.098);
    assert_close(passive, 116.47e3, 1e-3);
    assert_close(active, 12.94e3, 1e-3);
    assert_within((passive - active + 37.82e3) / 77.0e3, 1.84, 0.005);

    const kent_earth wall = {16e3, 36.0 * DEGREE, 0.0, (double)INFINITY, 9.81e3};
    assert_close(kent_face_passive(&wall, 0.0, 6.0), 1109.3e3, 5e-4);
    assert_close(kent_face_active(&wall, 0.0, 6.0), 74.8e3, 5e-4);
}

/* N/m: by the midpoints of many strips. */
static double by_strips(const kent_earth *e, double top, double base, bool passive)
{
    enum { STRIPS = 20000 };
    const double step = (base - top) / STRIPS;
    double sum = 0.0;

    for (int i = 0; i < STRIPS; i++) {
        const double z = top + (i + 0.5) * step;
        const double stress =
            e->unit_weight * z - e->water * fmax(0.0, z - e->water_table);
        const double kp = tan(0.25 * 3.14159265358979323846 + 0.5 * e->friction_angle);
        const double p = passive ? kp * kp * stress + 2.0 * e->cohesion * kp
                                 : stress / (kp * kp) - 2.0 * e->cohesion / kp;
        sum += fmax(0.0, p) * step;
    }
    return sum;
}

static void water_and_cohesion_are_summed_exactly(void **state)
{
    (void)state;
    static const double tables[] = {INFINITY, 0.0, 0.3, 1.2, 1.9, 3.0};
    for (size_t i = 0; i < sizeof tables / sizeof tables[0]; i++) {
        for (int sticks = 0; sticks < 3; sticks++) {
            const kent_earth e = {18e3, 25.0 * DEGREE, 4e3 * sticks, tables[i], 9.81e3};
            assert_close(kent_face_passive(&e, 0.8, 2.2), by_strips(&e, 0.8, 2.2, true),
                         1e-7);
            assert_within(kent_face_active(&e, 0.8, 2.2),
                          by_strips(&e, 0.8, 2.2, false), 0.5);
        }
    }
}

/* The mean over a face of 1.2 m at 2 m; water in the middle takes off h/8 more. */
static void water_that_cuts_a_face_takes_more_than_at_its_centre(void **state)
{
    (void)state;
    assert_close(kent_face_cut(2.0, 1.2, 2.0), 1.2 / 8.0, 1e-12);
    for (int i = 0; i <= 60; i++) {
        const double table = 1.0 + i / 30.0;
        double mean = 0.0;
        for (int k = 0; k < 10000; k++) {
            mean += fmax(0.0, 1.4 + 1.2 * (k + 0.5) / 10000.0 - table) / 10000.0;
        }
        assert_within(kent_face_cut(2.0, 1.2, table), mean - fmax(0.0, 2.0 - table),
                      1e-6);
    }
    assert_within(kent_face_cut(2.0, 1.2, (double)INFINITY), 0.0, 0.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(coulombs_coefficient_is_the_textbooks),
        cmocka_unit_test(without_wall_friction_coulomb_is_rankine),
        cmocka_unit_test(falling_ground_gives_less_the_steeper_it_falls),
        cmocka_unit_test(the_plane_of_failure_is_the_one_that_gives_least),
        cmocka_unit_test(a_face_finds_the_area_under_the_pressure),
        cmocka_unit_test(water_and_cohesion_are_summed_exactly),
        cmocka_unit_test(water_that_cuts_a_face_takes_more_than_at_its_centre),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
