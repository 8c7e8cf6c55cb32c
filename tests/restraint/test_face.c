/* Faces, thicknesses and weights of blocks from numbers alone. */
#include "kent_check.h"
#include "kent_restraint.h"

#include <stdio.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */
static const double FOOT = 0.3048;                           /* m */
static const double POUND = 4.4482216152605;                 /* N */

static const kent_rules RULES = {
    .safety_factor = 1.5,
    .height_to_depth = 0.5,
    .width_to_height = {1.0, 2.0},
    .least_thickness = 0.3,
    .least_height = 0.3,
    .side_step = 0.05,
    .least_cover = 0.6,
    .concrete_unit_weight = 24e3,
    .water_unit_weight = 9.81e3,
    .wrapped_ratio = 0.7,
    .largest_volume = 50.0,
};

/* Gravity block of a crest, one leg horizontal: V = 1.5 p A sin(angle) / W. Handbook
 * form from memory, values derived: 12 in (13.20) 45 degrees 150 psi gives 14 515 lbf
 * and 155.5, 150.2, 145.2 ft3 at 140, 145, 150 pcf; 8 in (9.05) 22.5 degrees
 * 200 psi 49.2 ft3 and 24 in (25.80) 11.25 degrees 150 psi 153.0 ft3 at 150 pcf. */
static void gravity_blocks_weigh_one_and_a_half_times_the_lift(void **state)
{
    (void)state;
    static const struct {
        double inches, degrees, psi, pcf, ft3, within;
    } row[] = {
        {13.20, 45.0, 150.0, 140.0, 155.5, 1e-3},
        {13.20, 45.0, 150.0, 145.0, 150.2, 1e-3},
        {13.20, 45.0, 150.0, 150.0, 145.2, 1e-3},
        {9.05, 22.5, 200.0, 150.0, 49.2, 2e-3},
        {25.80, 11.25, 150.0, 150.0, 153.0, 2e-3},
    };
    const double foot3 = FOOT * FOOT * FOOT;

    for (size_t i = 0; i < sizeof row / sizeof row[0]; i++) {
        const double d = row[i].inches;
        const double up =
            row[i].psi * 0.25 * PI * d * d * sin(row[i].degrees * DEGREE); /* lbf */
        if (i < 3) assert_close(up, 14515.0, 1e-3);
        const double volume =
            kent_gravity_volume(up * POUND, 1.5, row[i].pcf * POUND / foot3);
        assert_close(volume / foot3, row[i].ft3, row[i].within);
    }
}

static void at_the_limit_height_is_two_thirds_of_the_axis_depth(void **state)
{
    (void)state;
    for (int i = 1; i <= 50; i++) {
        const double axis = 0.1 * i;
        const double h = kent_face_height_limit(&RULES, axis);
        assert_close(h, axis * 2.0 / 3.0, 1e-14);
        assert_close(h, RULES.height_to_depth * (axis + 0.5 * h), 1e-14);
    }
}

static void sides_that_are_multiples_already_stay_as_they_are(void **state)
{
    (void)state;
    kent_face face = {0};

    /* 1.2 / 0.05 is 24.000000000000004 in double precision */
    assert_true(kent_face_choose(&RULES, 1.2 * 1.2, 1.2, &face));
    assert_close(face.width, 1.2, 1e-12);
    assert_close(face.height, 1.2, 1e-12);
}

static void between_faces_of_equal_area_the_taller_is_chosen(void **state)
{
    (void)state;
    kent_face face = {0};

    /* 0.45 m2 is 0.90 x 0.50 and 0.75 x 0.60: both exact, the taller wins */
    assert_true(kent_face_choose(&RULES, 0.45, 0.65, &face));
    assert_close(face.height, 0.60, 1e-12);
    assert_close(face.width, 0.75, 1e-12);
}

static void no_other_face_in_the_rules_is_smaller(void **state)
{
    (void)state;
    const double step = RULES.side_step;

    for (int k = 1; k <= 60; k++) {
        const double area = 0.037 * k, limit = 1.13;
        kent_face face = {0};
        const bool found = kent_face_choose(&RULES, area, limit, &face);
        double least = INFINITY;
        for (int i = 6; i * step <= limit; i++) {
            for (int j = i; j <= 2 * i; j++) { /* width, one to two heights */
                const double tried = i * step * (j * step);
                if (tried >= area - 1e-9) least = fmin(least, tried);
            }
        }
        assert_int_equal(found, isfinite(least));
        if (found) assert_close(face.width * face.height, least, 1e-9);
    }
}

static void a_face_too_large_for_its_depth_is_refused(void **state)
{
    (void)state;
    kent_face face = {0};

    assert_false(kent_face_choose(&RULES, 2.01, 1.0, &face)); /* most: 2.0 x 1.0 */
    assert_true(kent_face_choose(&RULES, 2.00, 1.0, &face));
    assert_false(kent_face_choose(&RULES, 0.01, 0.29, &face)); /* below least height */
}

static void weaker_soil_never_makes_a_smaller_face(void **state)
{
    (void)state;
    double last = 0.0;

    for (int q = 400; q >= 100; q--) { /* kPa */
        kent_face face = {0};
        if (!kent_face_choose(&RULES, 150.0 / q, 1.2, &face)) break;
        assert_true(face.width * face.height >= last - 1e-12);
        assert_true(face.width * face.height >= 150.0 / q * (1.0 - 1e-5));
        last = face.width * face.height;
    }
    assert_true(last > 0.0);
}

static void thickness_is_the_largest_of_the_least_and_the_spread(void **state)
{
    (void)state;
    assert_close(kent_block_thickness(&RULES, (kent_face){1.0, 0.8}, 0.6), 0.30, 1e-12);
    assert_close(kent_block_thickness(&RULES, (kent_face){2.0, 1.1}, 0.635), 0.70,
                 1e-12);
    assert_close(kent_block_thickness(&RULES, (kent_face){1.6, 1.6}, 0.6), 0.50, 1e-12);
    assert_close(kent_block_thickness(&RULES, (kent_face){1.0, 2.0}, 0.6), 0.70, 1e-12);
}

static void under_water_a_gravity_block_grows_by_the_water_s_weight(void **state)
{
    (void)state;
    const double dry = kent_gravity_volume(100e3, 1.5, 24e3);
    const double wet = kent_gravity_volume(100e3, 1.5, 24e3 - 9.81e3);
    assert_close(wet / dry, 24.0 / (24.0 - 9.81), 1e-14);
}

/* As a person would write them in a file: 14 steps of 0.05 m are 0.7 m. */
static void sides_are_exact_decimals(void **state)
{
    (void)state;
    for (int k = 6; k <= 60; k++) {
        char written[16];
        kent_face face = {0};
        const double side = k / 20.0; /* nearest to the decimal */
        (void)snprintf(written, sizeof written, "%.2f", side);
        assert_true(kent_face_choose(&RULES, side * side, side, &face));
        assert_true(face.height == strtod(written, NULL));
        assert_true(face.width == strtod(written, NULL));
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(sides_are_exact_decimals),
        cmocka_unit_test(gravity_blocks_weigh_one_and_a_half_times_the_lift),
        cmocka_unit_test(at_the_limit_height_is_two_thirds_of_the_axis_depth),
        cmocka_unit_test(sides_that_are_multiples_already_stay_as_they_are),
        cmocka_unit_test(between_faces_of_equal_area_the_taller_is_chosen),
        cmocka_unit_test(no_other_face_in_the_rules_is_smaller),
        cmocka_unit_test(a_face_too_large_for_its_depth_is_refused),
        cmocka_unit_test(weaker_soil_never_makes_a_smaller_face),
        cmocka_unit_test(thickness_is_the_largest_of_the_least_and_the_spread),
        cmocka_unit_test(under_water_a_gravity_block_grows_by_the_water_s_weight),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
