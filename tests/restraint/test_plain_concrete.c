/* Plain concrete by two codes, against their tables and worked examples. Where the
 * remark says so, values are from memory. */
#include "kent_check.h"
#include "kent_plain_concrete.h"

#include <math.h>

static const double INCH = 0.0254;                             /* m */
static const double FOOT = 0.3048;                             /* m */
static const double KIP = 4448.2216152605;                     /* N */
static const double PSI = 4.4482216152605 / (0.0254 * 0.0254); /* Pa */
static const double DAY = 86400.0;                             /* s */

/* EN 1992-1-1:2004, table 3.1, from memory: fck and the tensile strength that 95 of 100
 * samples reach, MPa, to one decimal, from a mean that is rounded so too. fctd,pl = 0.8
 * of that over 1.5 (12.3.1). */
static void tension_of_plain_concrete_is_the_table_of_en_1992(void **state)
{
    (void)state;
    static const double ROWS[][2] = {
        {12, 1.1}, {16, 1.3}, {20, 1.5}, {25, 1.8}, {30, 2.0}, {35, 2.2}, {40, 2.5},
        {45, 2.7}, {50, 2.9}, {55, 3.0}, {60, 3.1}, {70, 3.2}, {80, 3.4}, {90, 3.5}};

    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const double pulled = kent_concrete_pulled(KENT_EN_1992, 1e6 * ROWS[i][0]);
        assert_within(pulled * 1.5 / 0.8, 1e6 * ROWS[i][1], 0.055e6);
    }
    assert_close(kent_concrete_pressed(KENT_EN_1992, 25e6), 0.8 * 25e6 / 1.5, 1e-12);
}

/* 12.6.3: 1.5 V/A against the tensile strength where nothing presses along. */
static void shear_of_plain_concrete_is_two_thirds_of_its_tension(void **state)
{
    (void)state;
    const double pulled = kent_concrete_pulled(KENT_EN_1992, 20e6);
    assert_close(kent_concrete_sheared(KENT_EN_1992, 20e6), pulled / 1.5, 1e-12);
}

/* ACI 318-19, 14.5.2.1 and 14.5.5.1: 5 sqrt(f'c) and 4/3 sqrt(f'c) psi, phi 0.60. The
 * SI edition rounds them to 0.42 and 0.11 sqrt(f'c) MPa. */
static void tension_and_shear_of_aci_318_in_both_of_its_units(void **state)
{
    (void)state;
    const double f = 4000.0 * PSI;
    assert_close(kent_concrete_pulled(KENT_ACI_318, f) / PSI, 0.6 * 316.2278, 1e-6);
    assert_close(kent_concrete_sheared(KENT_ACI_318, f) / PSI, 0.6 * 84.3274, 1e-6);
    assert_close(kent_concrete_pulled(KENT_ACI_318, 25e6), 0.6 * 0.42 * 5.0e6, 0.012);
    assert_close(kent_concrete_sheared(KENT_ACI_318, 25e6), 0.6 * 0.11 * 5.0e6, 0.012);
}

/* McCormac and Brown, Design of Reinforced Concrete, chapter 12, the plain footing
 * under a 12 in wall, from memory: 5 ft 6 in wide, 24 in thick, 3000 psi, 24 k/ft in
 * all. Book: Mu 11.04 ft k, S 968 in3, phi Mn 12.15 ft k and phi Vn 10.60 k at the phi
 * of its code, 0.55; Vu 1.82 k. */
static void a_wall_footing_of_a_textbook(void **state)
{
    (void)state;
    const kent_face strip = {5.5 * FOOT, FOOT}, wall = {FOOT, FOOT};
    const kent_plain_use use = kent_concrete_footing(KENT_ACI_318, 3000.0 * PSI, wall,
                                                     strip, 24.0 * INCH, 24.0 * KIP);

    assert_close(use.bending, 11.04 / (12.15 * 0.60 / 0.55), 2e-3);
    assert_close(use.shear, 1.82 / (10.60 * 0.60 / 0.55), 5e-3);
    assert_true(kent_concrete_carries(&use));
    assert_close(use.punching, 0.0, 0.0); /* the cut would reach beyond a strip */
}

/* By hand: 6 ft square, 12 in square contact, 20 in thick of which 18 count, 3000 psi,
 * 108 k: 3000 psf; cut 30 in square, 120 in round; outside it 36 - 6.25 = 29.75 ft2 or
 * 89.25 k; 0.60 x 2 x 4/3 x sqrt(3000) x 120 x 18 = 189.3 k. */
static void a_square_footing_is_cut_round_its_contact(void **state)
{
    (void)state;
    const kent_face plan = {6.0 * FOOT, 6.0 * FOOT}, square = {FOOT, FOOT};
    const kent_face flat = {0.5 * FOOT, 2.0 * FOOT}; /* 1 + 2/4 in place of 2 */
    const kent_plain_use use = kent_concrete_footing(KENT_ACI_318, 3000.0 * PSI, square,
                                                     plan, 20.0 * INCH, 108.0 * KIP);
    const kent_plain_use slit = kent_concrete_footing(KENT_ACI_318, 3000.0 * PSI, flat,
                                                      plan, 20.0 * INCH, 108.0 * KIP);

    assert_close(use.punching, 89.25 / 189.3, 1e-3);
    /* 24 x 42 in, 132 in round; 29 ft2 or 87 k; three quarters of 208.2 k */
    assert_close(slit.punching, 87.0 / (0.75 * 208.2), 1e-3);
}

static void against_soil_the_first_two_inches_count_for_nothing(void **state)
{
    (void)state;
    const kent_face plan = {1.0, 1.0}, contact = {0.2, 0.2};
    const kent_plain_use use =
        kent_concrete_footing(KENT_ACI_318, 20e6, contact, plan, 2.0 * INCH, 1e3);
    assert_true(isinf(use.bending) && isinf(use.shear) && isinf(use.punching));
    assert_false(kent_concrete_carries(&use));
}

/* EN 1992-1-1, 12.9.3: 0.85 h/a >= sqrt(3 sigma/fctd). By hand: C25, fctm = 0.30 x
 * 25^(2/3) = 2.565 MPa, fctd = 0.8 x 0.7 x 2.565/1.5 = 0.9576; 200 kPa and 0.6 m out:
 * 0.5588 m. */
static void a_footing_of_en_1992_is_as_thick_as_its_formula(void **state)
{
    (void)state;
    const kent_face plan = {1.5, 1.5}, contact = {0.3, 0.3};
    const double load = 200e3 * 1.5 * 1.5;
    kent_plain_use use =
        kent_concrete_footing(KENT_EN_1992, 25e6, contact, plan, 0.5588, load);

    assert_close(use.bending, 1.0, 1e-3);
    assert_close(use.shear, 1.5 * 0.2 * 0.6 / (0.9576 * 0.5588), 1e-3);
    assert_true(isnan(use.punching));
    use = kent_concrete_footing(KENT_EN_1992, 25e6, contact, plan, 0.55, load);
    assert_false(kent_concrete_carries(&use));
    use = kent_concrete_footing(KENT_EN_1992, 25e6, contact, plan, 0.56, load);
    assert_true(kent_concrete_carries(&use));
    use = kent_concrete_footing(KENT_EN_1992, 25e6, plan, contact, 0.1, load);
    assert_close(use.bending, 0.0, 0.0); /* nothing stands out */
}

/* The simplification of 12.9.3, h/a = 2, is for any ground pressure that soil bears:
 * the formula asks for less up to 0.963 fctd. */
static void twice_the_overhang_is_always_enough(void **state)
{
    (void)state;
    const kent_face plan = {1.2, 0.8}, contact = {0.2, 0.2};
    for (int q = 50; q <= 600; q += 50) {
        const kent_plain_use use = kent_concrete_footing(
            KENT_EN_1992, 16e6, contact, plan, 1.0, 1e3 * q * 1.2 * 0.8);
        assert_true(use.bending <= 1.0);
    }
}

/* McCormac and Brown, chapter 12, dowels under a 16 in column on a footing of 3000 psi,
 * from memory: 2 x 0.65 x 0.85 x 3 x 256 = 848.6 k. Plain concrete has phi 0.60. */
static void a_column_on_a_wide_footing_presses_twice_as_hard(void **state)
{
    (void)state;
    const kent_face column = {16.0 * INCH, 16.0 * INCH};
    const kent_face wide = {93.0 * INCH, 93.0 * INCH},
                    narrow = {24.0 * INCH, 93.0 * INCH};
    const double area = column.width * column.height, f = 3000.0 * PSI;
    double k = kent_concrete_widening(KENT_ACI_318, column, wide, 20.0 * INCH);

    assert_close(k, 2.0, 1e-12);
    assert_close(k * area * kent_concrete_pressed(KENT_ACI_318, f),
                 848.6 * KIP * 0.60 / 0.65, 1e-4);
    k = kent_concrete_widening(KENT_ACI_318, column, narrow, 20.0 * INCH);
    assert_close(k, 1.5, 1e-12); /* stays inside the side */
    k = kent_concrete_widening(KENT_ACI_318, column, wide, 2.0 * INCH);
    assert_close(k, 1.5, 1e-12); /* 2 across for 1 in depth, both ways */
}

/* EN 1992-1-1, 6.7: sides at most threefold, and no more wider than the concrete is
 * deep; the two areas similar. */
static void a_load_widens_by_the_geometry_of_en_1992(void **state)
{
    (void)state;
    const kent_face contact = {0.2, 0.3};

    assert_close(
        kent_concrete_widening(KENT_EN_1992, contact, (kent_face){3.0, 3.0}, 2.0), 3.0,
        1e-12);
    assert_close(
        kent_concrete_widening(KENT_EN_1992, contact, (kent_face){3.0, 3.0}, 0.3), 2.0,
        1e-12);
    assert_close(
        kent_concrete_widening(KENT_EN_1992, contact, (kent_face){0.3, 3.0}, 2.0), 1.5,
        1e-12);
    assert_close(
        kent_concrete_widening(KENT_EN_1992, contact, (kent_face){0.3, 0.36}, 2.0), 1.2,
        1e-12);
    assert_close(
        kent_concrete_widening(KENT_EN_1992, contact, (kent_face){0.1, 0.1}, 2.0), 1.0,
        1e-12);
}

static void contacts(void **state)
{
    (void)state;
    kent_face c = kent_contact_usual(0.6, 0.1);
    assert_close(c.width, 0.15, 1e-12);
    assert_close(c.height, 0.42426, 1e-4);
    c = kent_contact_of(0.16, 0.6);
    assert_close(c.width, 0.4, 1e-12);
    assert_close(c.height, 0.4, 1e-12);
    c = kent_contact_of(0.6, 0.6);
    assert_close(c.width, 1.0, 1e-12);
    assert_close(c.height, 0.6, 1e-12);
}

/* CEB-FIP Model Code 1990, 2.1.6.1, tabled shares of the 28 day mean at 3, 7 and 14
 * days for slow, normal and rapid cement, from memory; EN 1992-1-1, 3.1.2(6) is the
 * same form. */
static void mean_strength_grows_as_tabled(void **state)
{
    (void)state;
    static const struct {
        kent_cement cement;
        double share[3];
    } ROWS[] = {{KENT_CEMENT_SLOW, {0.46, 0.68, 0.85}},
                {KENT_CEMENT_NORMAL, {0.60, 0.78, 0.90}},
                {KENT_CEMENT_RAPID, {0.66, 0.82, 0.92}}};
    static const double DAYS[] = {3.0, 7.0, 14.0};

    for (size_t i = 0; i < 3; i++) {
        for (size_t k = 0; k < 3; k++) {
            const double f = kent_concrete_strength_at(KENT_EN_1992, ROWS[i].cement,
                                                       25e6, DAY * DAYS[k]);
            assert_within((f + 8e6) / 33e6, ROWS[i].share[k], 0.0051);
        }
    }
    assert_close(
        kent_concrete_strength_at(KENT_EN_1992, KENT_CEMENT_SLOW, 25e6, 90 * DAY), 25e6,
        1e-12);
}

/* ACI 209R-92, table 2.2.1, moist cured, types I and III, from memory. */
static void strength_grows_as_aci_209_has_it(void **state)
{
    (void)state;
    static const double DAYS[] = {3.0, 7.0, 14.0, 28.0};
    static const double TYPE_I[] = {0.46, 0.70, 0.88, 1.0};
    static const double TYPE_III[] = {0.59, 0.80, 0.92, 1.0};

    for (size_t k = 0; k < 4; k++) {
        assert_within(kent_concrete_strength_at(KENT_ACI_318, KENT_CEMENT_NORMAL, 1.0,
                                                DAY * DAYS[k]),
                      TYPE_I[k], 0.0051);
        assert_within(kent_concrete_strength_at(KENT_ACI_318, KENT_CEMENT_RAPID, 1.0,
                                                DAY * DAYS[k]),
                      TYPE_III[k], 0.0051);
    }
    /* it has no slow cement: that of EN 1992-1-1 */
    assert_within(
        kent_concrete_strength_at(KENT_ACI_318, KENT_CEMENT_SLOW, 1.0, 7.0 * DAY), 0.68,
        0.0051);
}

/* The least whole day at which the strength is there: the day before it is not. */
static void the_least_age_is_the_first_day_that_has_the_strength(void **state)
{
    (void)state;
    static const double F = 20e6;

    for (int code = KENT_EN_1992; code <= KENT_ACI_318; code++) {
        for (int cement = KENT_CEMENT_NORMAL; cement <= KENT_CEMENT_SLOW; cement++) {
            for (int half = 4; half < 40; half++) {
                const double f = 0.5e6 * half;
                const kent_concrete_code by = (kent_concrete_code)code;
                const kent_cement of = (kent_cement)cement;
                const double age = kent_concrete_age(by, of, F, f);
                assert_close(fmod(age, DAY), 0.0, 0.0);
                assert_true(age >= 3.0 * DAY && age <= 28.0 * DAY);
                assert_true(kent_concrete_strength_at(by, of, F, age) >= f - 1e-3);
                if (age <= 3.0 * DAY) continue;
                assert_true(kent_concrete_strength_at(by, of, F, age - DAY) < f);
            }
        }
    }
    assert_close(kent_concrete_age(KENT_EN_1992, KENT_CEMENT_NORMAL, F, F), 28.0 * DAY,
                 1e-12);
    assert_true(
        isnan(kent_concrete_age(KENT_EN_1992, KENT_CEMENT_NORMAL, F, 1.01 * F)));
    assert_close(kent_concrete_age(KENT_ACI_318, KENT_CEMENT_RAPID, F, 0.0), 3.0 * DAY,
                 1e-12);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(tension_of_plain_concrete_is_the_table_of_en_1992),
        cmocka_unit_test(shear_of_plain_concrete_is_two_thirds_of_its_tension),
        cmocka_unit_test(tension_and_shear_of_aci_318_in_both_of_its_units),
        cmocka_unit_test(a_wall_footing_of_a_textbook),
        cmocka_unit_test(a_square_footing_is_cut_round_its_contact),
        cmocka_unit_test(against_soil_the_first_two_inches_count_for_nothing),
        cmocka_unit_test(a_footing_of_en_1992_is_as_thick_as_its_formula),
        cmocka_unit_test(twice_the_overhang_is_always_enough),
        cmocka_unit_test(a_column_on_a_wide_footing_presses_twice_as_hard),
        cmocka_unit_test(a_load_widens_by_the_geometry_of_en_1992),
        cmocka_unit_test(contacts),
        cmocka_unit_test(mean_strength_grows_as_tabled),
        cmocka_unit_test(strength_grows_as_aci_209_has_it),
        cmocka_unit_test(the_least_age_is_the_first_day_that_has_the_strength),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
