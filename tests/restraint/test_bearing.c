/* What soil gives a face, by each of the ways in which its bearing is known. */
#include "kent_bearing.h"
#include "kent_check.h"

#include <math.h>

static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */
static const double FOOT = 0.3048;                           /* m */
static const double PSF = 47.880258980335843;                /* Pa */
static const double PCF = 157.08746384625278;                /* N/m3 */

static kent_bearing_place dry(double depth)
{
    return (kent_bearing_place){depth, (double)INFINITY, 9.81e3, 0.0, 0.0};
}

static double bearing_at(const kent_soil *soil, const kent_bearing_place *at)
{
    kent_bearing_gap gap = KENT_BEARING_LACKS;
    const double q = kent_soil_bearing(soil, at, &gap);
    assert_int_equal(gap, KENT_BEARING_KNOWN);
    return q;
}

static kent_bearing_gap gap_at(const kent_soil *soil, double depth)
{
    const kent_bearing_place at = dry(depth);
    kent_bearing_gap gap = KENT_BEARING_KNOWN;
    const double q = kent_soil_bearing(soil, &at, &gap);
    assert_true(isnan(q) == (gap != KENT_BEARING_KNOWN));
    return gap;
}

/* USDA NRCS, National Engineering Handbook part 636, chapter 52, table 52-6, seen in
 * reproduction: allowable psf at 2, 3, 4 and 5 ft. */
static const struct {
    double phi, psf[4]; /* degrees */
} USDA[] = {{40.0, {1200.0, 1800.0, 2400.0, 3000.0}},
            {35.0, {800.0, 1200.0, 1650.0, 2100.0}},
            {25.0, {500.0, 700.0, 950.0, 1200.0}}};

static kent_soil usda_soil(size_t row)
{
    kent_soil s = kent_soil_blank();
    s.route = KENT_BEARING_BY_DEPTH;
    s.by_depth_count = 4;
    s.factor_inside = 1.0;
    for (size_t k = 0; k < 4; k++) {
        s.by_depth[k].depth = (2.0 + (double)k) * FOOT;
        s.by_depth[k].bearing = USDA[row].psf[k] * PSF;
    }
    return s;
}

static void a_table_by_depth_gives_its_rows_and_straight_lines_between(void **state)
{
    (void)state;
    for (size_t i = 0; i < sizeof USDA / sizeof USDA[0]; i++) {
        const kent_soil s = usda_soil(i);
        for (size_t k = 0; k < 4; k++) {
            const kent_bearing_place row = dry((2.0 + (double)k) * FOOT);
            assert_close(bearing_at(&s, &row), USDA[i].psf[k] * PSF, 1e-12);
            if (k == 3) continue;
            const kent_bearing_place between = dry((2.25 + (double)k) * FOOT);
            const double quarter = 0.75 * USDA[i].psf[k] + 0.25 * USDA[i].psf[k + 1];
            assert_close(bearing_at(&s, &between), quarter * PSF, 1e-12);
        }
    }
}

static void below_its_last_row_a_table_gives_no_more_and_above_nothing(void **state)
{
    (void)state;
    const kent_soil s = usda_soil(0);
    const kent_bearing_place deep = dry(20.0 * FOOT);

    assert_close(bearing_at(&s, &deep), 3000.0 * PSF, 1e-12);
    assert_int_equal(gap_at(&s, 1.99 * FOOT), KENT_BEARING_ABOVE_TABLE);
    assert_int_equal(gap_at(&s, 2.0 * FOOT), KENT_BEARING_KNOWN);
    assert_int_equal(gap_at(&s, (double)NAN), KENT_BEARING_NO_DEPTH);
}

/* International Building Code 2012, table 1806.2: lateral bearing, psf per ft of depth
 * (crystalline rock; sedimentary rock; sandy gravel; sand; clay). */
static void a_gradient_gives_so_much_per_depth(void **state)
{
    (void)state;
    static const double psf_per_ft[] = {1200.0, 400.0, 200.0, 150.0, 100.0};
    for (size_t i = 0; i < sizeof psf_per_ft / sizeof psf_per_ft[0]; i++) {
        kent_soil s = kent_soil_blank();
        s.route = KENT_BEARING_GRADIENT;
        s.bearing_gradient = psf_per_ft[i] * PSF / FOOT;
        const kent_bearing_place at = dry(4.0 * FOOT);
        assert_close(bearing_at(&s, &at), 4.0 * psf_per_ft[i] * PSF, 1e-12);
        assert_int_equal(gap_at(&s, (double)NAN), KENT_BEARING_NO_DEPTH);
    }
}

static void a_presumptive_value_is_the_same_at_every_depth(void **state)
{
    (void)state;
    kent_soil s = kent_soil_blank();
    s.allowable_bearing = 150e3;
    const kent_bearing_place shallow = dry(0.7), deep = dry(5.0), unknown = dry(NAN);
    assert_close(bearing_at(&s, &shallow), 150e3, 0.0);
    assert_close(bearing_at(&s, &deep), 150e3, 0.0);
    assert_close(bearing_at(&s, &unknown), 150e3, 0.0);
}

static kent_soil passive_soil(double weight, double phi, double cohesion, double share)
{
    kent_soil s = kent_soil_blank();
    s.route = KENT_BEARING_PASSIVE;
    s.unit_weight = weight;
    s.friction_angle = phi * DEGREE;
    s.cohesion = cohesion;
    s.passive_share = share;
    s.factor_inside = 1.0;
    return s;
}

/* Passive pressure rises in a straight line, so that what a face finds is that at its
 * centre times its height. Das, B. M., Principles of Geotechnical Engineering, example
 * 13.2, p 449: 16 kN/m3, 36 degrees, a wall of 6 m: 1109.3 kN/m. A design sheet whose
 * arithmetic holds: 19.2 kN/m3, Kp 3 (30 degrees), a block from 0.598 m to 2.098 m:
 * 116.47 kN/m. */
static void a_face_finds_the_passive_thrust_of_the_textbook(void **state)
{
    (void)state;
    const kent_soil wall = passive_soil(16e3, 36.0, 0.0, 1.0);
    const kent_bearing_place middle = dry(3.0);
    assert_close(bearing_at(&wall, &middle) * 6.0, 1109.3e3, 5e-4);

    const kent_soil sheet = passive_soil(19.2e3, 30.0, 0.0, 1.0);
    const kent_bearing_place block = dry(0.5 * (0.598 + 2.098));
    assert_close(bearing_at(&sheet, &block) * 1.5, 116.47e3, 1e-3);
}

/* Das, B. M., Principles of Foundation Engineering, example 7.7, p 342: 15.72 kN/m3
 * above water at 2 m, 30 degrees: 94.32 kPa; below, 18.86 kN/m3, 26 degrees and 10 kPa:
 * 112.53 kPa, and 135.70 kPa 1 m deeper. Below, the soil stands here as one with water
 * to the surface at the depth where its effective stress is the same. */
static void under_water_only_the_buoyant_weight_presses(void **state)
{
    (void)state;
    const kent_soil upper = passive_soil(15.72e3, 30.0, 0.0, 1.0);
    const kent_soil lower = passive_soil(18.86e3, 26.0, 10e3, 1.0);
    const kent_bearing_place top = {2.0, 2.0, 9.81e3, 0.0, 0.0};
    const double depth = 31.44 / (18.86 - 9.81);
    const kent_bearing_place boundary = {depth, 0.0, 9.81e3, 0.0, 0.0};
    const kent_bearing_place base = {depth + 1.0, 0.0, 9.81e3, 0.0, 0.0};

    assert_close(kent_effective_stress(15.72e3, &top), 31.44e3, 1e-12);
    assert_close(bearing_at(&upper, &top), 94.32e3, 1e-4);
    assert_close(bearing_at(&lower, &boundary), 112.53e3, 1e-4);
    assert_close(bearing_at(&lower, &base), 135.70e3, 1e-4);
}

/* Water that stands between ground and face takes its weight off below it only. */
static void water_counts_from_its_table_down(void **state)
{
    (void)state;
    for (int i = 0; i <= 20; i++) {
        const double table = 0.2 * i; /* m; the face at 2 m */
        const kent_bearing_place at = {2.0, table, 9.81e3, 0.0, 0.0};
        const double under = table < 2.0 ? 2.0 - table : 0.0;
        assert_close(kent_effective_stress(19e3, &at), 38e3 - 9.81e3 * under, 1e-12);
    }
}

static void passive_bearing_takes_its_share_and_wants_every_value(void **state)
{
    (void)state;
    const kent_soil whole = passive_soil(19e3, 30.0, 5e3, 1.0);
    const kent_soil third = passive_soil(19e3, 30.0, 5e3, 1.0 / 3.0);
    const kent_bearing_place at = dry(1.8);
    assert_close(3.0 * bearing_at(&third, &at), bearing_at(&whole, &at), 1e-12);

    for (int lost = 0; lost < 3; lost++) {
        kent_soil s = whole;
        if (lost == 0) s.unit_weight = (double)NAN;
        if (lost == 1) s.friction_angle = (double)NAN;
        if (lost == 2) s.cohesion = (double)NAN;
        assert_int_equal(gap_at(&s, 1.8), KENT_BEARING_LACKS);
    }
}

/* ---- what a bearing implies ------------------------------------------------------ */

/* By the numbers: 3000 psf over 120 pcf x 5 ft is 5. */
static void a_presumptive_3000_psf_at_5_ft_takes_a_coefficient_of_five(void **state)
{
    (void)state;
    kent_soil s = kent_soil_blank();
    kent_bearing_claim claim;
    s.allowable_bearing = 3000.0 * PSF;
    s.factor_inside = 1.0;
    s.unit_weight = 120.0 * PCF;
    const kent_bearing_place at = dry(5.0 * FOOT);

    assert_true(kent_bearing_claims(&s, &at, &claim));
    assert_close(claim.passive, 5.0, 1e-9);
    assert_false(claim.weight_assumed);
    assert_true(claim.passive > KENT_PASSIVE_UNLIKELY);

    s.unit_weight = (double)NAN; /* the weight assumed is that one, rounded */
    assert_true(kent_bearing_claims(&s, &at, &claim));
    assert_close(claim.passive, 5.0, 1e-4);
    assert_close(claim.unit_weight, 18.85e3, 0.0);
    assert_true(claim.weight_assumed);

    s.factor_inside = 2.0;
    assert_true(kent_bearing_claims(&s, &at, &claim));
    assert_close(claim.bearing, 6000.0 * PSF, 1e-12);
    assert_close(claim.passive, 10.0, 1e-4);

    const kent_bearing_place unknown = dry(NAN);
    assert_false(kent_bearing_claims(&s, &unknown, &claim));
    s.allowable_bearing = 0.0;
    assert_false(kent_bearing_claims(&s, &at, &claim));
}

/* Rankine's coefficients, to five figures; 40 degrees is the limit of what is likely.
 * The table of the National Engineering Handbook (above) is near Kp x 130 pcf x depth
 * at 40 degrees. */
static void what_passive_pressure_gives_implies_its_own_coefficient(void **state)
{
    (void)state;
    static const double table[][2] = {
        {20.0, 2.0396}, {25.0, 2.4639}, {30.0, 3.0000}, {35.0, 3.6902}, {40.0, 4.5989}};

    for (size_t i = 0; i < sizeof table / sizeof table[0]; i++) {
        for (int c = 0; c <= 20; c += 10) {
            const kent_soil s = passive_soil(19e3, table[i][0], 1e3 * c, 1.0);
            const kent_bearing_place at = {1.8, 1.0, 9.81e3, 0.0, 0.0};
            kent_bearing_claim claim;
            assert_true(kent_bearing_claims(&s, &at, &claim));
            assert_within(claim.passive, table[i][1], 1e-4);
            assert_true(claim.passive < KENT_PASSIVE_UNLIKELY);
        }
    }
    assert_within(KENT_PASSIVE_UNLIKELY, table[4][1], 0.002);

    kent_soil s = usda_soil(0);
    s.unit_weight = 130.0 * PCF;
    const kent_bearing_place at = dry(5.0 * FOOT);
    kent_bearing_claim claim;
    assert_true(kent_bearing_claims(&s, &at, &claim));
    assert_close(claim.passive, table[4][1], 0.005);
}

static void cohesion_not_stated_counts_as_none(void **state)
{
    (void)state;
    assert_close(kent_implied_passive(100e3, (double)NAN, 40e3), 2.5, 1e-12);
    assert_close(kent_implied_passive(100e3, 0.0, 40e3), 2.5, 1e-12);
    assert_true(kent_implied_passive(100e3, 10e3, 40e3) < 2.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_table_by_depth_gives_its_rows_and_straight_lines_between),
        cmocka_unit_test(below_its_last_row_a_table_gives_no_more_and_above_nothing),
        cmocka_unit_test(a_gradient_gives_so_much_per_depth),
        cmocka_unit_test(a_presumptive_value_is_the_same_at_every_depth),
        cmocka_unit_test(a_face_finds_the_passive_thrust_of_the_textbook),
        cmocka_unit_test(under_water_only_the_buoyant_weight_presses),
        cmocka_unit_test(water_counts_from_its_table_down),
        cmocka_unit_test(passive_bearing_takes_its_share_and_wants_every_value),
        cmocka_unit_test(a_presumptive_3000_psf_at_5_ft_takes_a_coefficient_of_five),
        cmocka_unit_test(what_passive_pressure_gives_implies_its_own_coefficient),
        cmocka_unit_test(cohesion_not_stated_counts_as_none),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
