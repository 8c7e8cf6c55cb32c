/* Blocks in soils whose bearing goes with depth: sizes, refusals, the hand calculation.
 */
#include "kent_hand.h"

#include <stdlib.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6}};

/* 1.5 x 2 p A sin(11.25 deg), N: the factored load of the bend below. */
static double factored(void)
{
    return 1.5 * 2.0 * 1.0e6 * 0.25 * PI * 0.62 * 0.62 * sin(11.25 * DEGREE);
}

/* A main of 620 mm that turns left by 22.5 degrees at B, and there rises by `rise` per
 * leg (m); cover 1.5 m, so the axis lies at 1.81 m; 19 kN/m3. */
static kent_build main_in(kent_bearing_route route, double rise)
{
    kent_build b = kent_build_new();
    const double turn = rise > 0.0 ? 0.0 : 22.5 * DEGREE;

    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0 + rise);
    (void)kent_build_point(&b, "B", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 200.0 * cos(turn), 200.0 * sin(turn), 50.0 + rise);
    (void)kent_build_pipe(&b, "P", "A B C", 0.6, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "C", 0.0);
    (void)kent_build_soil(&b, "till", NAN, 19e3, 1.5);
    kent_soil *s = &b.model->soils[0];
    s->route = route;
    s->allowable_bearing = 500e3; /* of no account on another route */
    s->by_depth[0] = (kent_depth_row){1.0, 60e3};
    s->by_depth[1] = (kent_depth_row){1.5, 100e3};
    s->by_depth[2] = (kent_depth_row){2.5, 140e3};
    s->by_depth_count = 3;
    s->bearing_gradient = 50e3;
    s->friction_angle = 30.0 * DEGREE;
    s->cohesion = 6e3;
    s->passive_share = 0.8;
    b.model->ground.water_table = (double)INFINITY;
    b.model->loads.test_pressure = 1.0e6;
    return b;
}

static const kent_holding *at_b(const kent_build *b, const kent_restraints *r)
{
    return &r->fittings[kent_build_fitting_of(b, "B")];
}

static kent_restraints *sized(kent_build *b)
{
    kent_build_derive(b);
    return kent_hand_size(b, TEST, 1);
}

static void finish(kent_build *b, kent_restraints *r)
{
    kent_restraints_free(r);
    kent_build_clear(b);
}

/* By hand at 1.81 m: the table 100 + 0.31 x 40 = 112.4 kPa; the gradient 50 x 1.81 =
 * 90.5 kPa; 0.8 of 3 x 19 x 1.81 + 2 x 6 x sqrt(3) = 103.17 + 20.785 kPa; the same
 * with water at 1.0 m: 3 x (34.39 - 9.81 x 0.81). */
static void the_bearing_at_the_axis_sizes_the_face(void **state)
{
    (void)state;
    const double cohesive = 2.0 * 6e3 * sqrt(3.0), water = 9.80665e3;
    const struct {
        kent_bearing_route route;
        double table, bearing; /* m, Pa */
    } ways[] = {
        {KENT_BEARING_BY_DEPTH, INFINITY, 112.4e3},
        {KENT_BEARING_GRADIENT, INFINITY, 90.5e3},
        {KENT_BEARING_PASSIVE, INFINITY, 0.8 * (103.17e3 + cohesive)},
        {KENT_BEARING_PASSIVE, 1.0, 0.8 * (103.17e3 - 3.0 * water * 0.81 + cohesive)}};

    for (size_t i = 0; i < sizeof ways / sizeof ways[0]; i++) {
        kent_build b = main_in(ways[i].route, 0.0);
        b.model->ground.water_table = ways[i].table;
        b.model->rules.water_unit_weight = water;
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_b(&b, r);
        assert_true(h->held);
        assert_close(h->allowable_bearing, ways[i].bearing, 1e-9);
        assert_close(h->block.bearing_area, factored() / ways[i].bearing, 1e-9);
        assert_close(h->block.bearing_pressure,
                     factored() / (h->block.width * h->block.height), 1e-9);
        assert_close(h->utilisation, h->block.bearing_pressure / ways[i].bearing, 1e-9);
        finish(&b, r);
    }
}

static void deeper_ground_of_a_gradient_takes_a_smaller_face(void **state)
{
    (void)state;
    double last = (double)INFINITY;
    for (int i = 0; i <= 10; i++) {
        kent_build b = main_in(KENT_BEARING_GRADIENT, 0.0);
        b.model->ground.cover = 1.5 + 0.1 * i;
        kent_restraints *r = sized(&b);
        assert_true(at_b(&b, r)->block.bearing_area < last);
        last = at_b(&b, r)->block.bearing_area;
        finish(&b, r);
    }
}

/* The axis must be no shallower than the first row, 1.0 m; with it there, 60 kPa. */
static void above_the_first_row_of_a_table_there_is_no_block(void **state)
{
    (void)state;
    for (int under = 0; under < 2; under++) {
        kent_build b = main_in(KENT_BEARING_BY_DEPTH, 0.0);
        b.model->ground.cover = under ? 0.6901 : 0.6899;
        kent_restraints *r = sized(&b);
        const bool told = kent_hand_says(
            at_b(&b, r), "the bearing of soil 'till' is given from 1.00 m down, and "
                         "the centre of the face lies at 1.00 m");
        assert_true(told == (under == 0));
        assert_true(isnan(at_b(&b, r)->allowable_bearing) == (under == 0));
        finish(&b, r);
    }
}

static void passive_bearing_without_its_values_is_refused_by_their_names(void **state)
{
    (void)state;
    kent_build b = main_in(KENT_BEARING_PASSIVE, 0.0);
    b.model->soils[0].cohesion = (double)NAN;
    kent_restraints *r = sized(&b);
    assert_false(at_b(&b, r)->held);
    kent_hand_expect(at_b(&b, r), "wants unit_weight, friction_angle and cohesion");
    finish(&b, r);
}

/* A table that begins with ground that bears nothing. */
static void where_a_table_bears_nothing_there_is_no_block(void **state)
{
    (void)state;
    kent_build b = main_in(KENT_BEARING_BY_DEPTH, 0.0);
    b.model->soils[0].by_depth[1] = (kent_depth_row){2.0, 0.0};
    b.model->soils[0].by_depth[0].bearing = 0.0;
    kent_restraints *r = sized(&b);
    assert_false(at_b(&b, r)->held);
    kent_hand_expect(at_b(&b, r), "bears nothing at a depth of 1.81 m");
    finish(&b, r);
}

static void a_base_wants_a_bearing_of_its_own(void **state)
{
    (void)state;
    static const kent_bearing_route routes[] = {
        KENT_BEARING_BY_DEPTH, KENT_BEARING_GRADIENT, KENT_BEARING_PASSIVE};
    for (size_t i = 0; i < sizeof routes / sizeof routes[0]; i++) {
        for (int given = 0; given < 2; given++) {
            kent_build b = main_in(routes[i], 20.0);
            if (given) b.model->soils[0].vertical_bearing = 100e3;
            kent_restraints *r = sized(&b);
            assert_true(at_b(&b, r)->held == (given > 0));
            assert_true(kent_hand_says(at_b(&b, r), "give vertical_bearing, or ") ==
                        (given == 0));
            finish(&b, r);
        }
    }
}

/* A row of the catalogue cannot be added to: the case takes it over. */
static void a_catalogues_soil_is_to_be_taken_over_for_a_base(void **state)
{
    (void)state;
    kent_build b = main_in(KENT_BEARING_BY_DEPTH, 20.0);
    kent_soil *soil = &b.model->soils[0];
    soil->place.line = 0;
    (void)snprintf(soil->source, sizeof soil->source, "a handbook (seen)");
    kent_restraints *r = sized(&b);
    char words[120];
    (void)snprintf(words, sizeof words,
                   "give vertical_bearing to an element of soils, from = \"%s\", or ",
                   soil->id);
    kent_hand_expect(at_b(&b, r), words);
    finish(&b, r);
}

/* The cover that is said to help does, with what the ground bears there; 5 cm less does
 * not. */
static void the_cover_that_would_serve_counts_on_deeper_ground(void **state)
{
    (void)state;
    double cover = 0.0;
    for (int pass = 0; pass < 3; pass++) {
        kent_build b = main_in(KENT_BEARING_GRADIENT, 0.0);
        b.model->soils[0].bearing_gradient = 15e3;
        if (pass > 0) b.model->ground.cover = pass == 1 ? cover : cover - 0.05;
        kent_restraints *r = sized(&b);
        assert_true(at_b(&b, r)->held == (pass == 1));
        if (pass == 0) {
            const char *said = strstr(at_b(&b, r)->cautions.text[0], "a cover of ");
            assert_non_null(said);
            cover = strtod(said + strlen("a cover of "), NULL);
            assert_true(cover > 1.5);
        }
        finish(&b, r);
    }
}

static void any_route_is_doubted_where_it_takes_too_much(void **state)
{
    (void)state;
    kent_build b = main_in(KENT_BEARING_GRADIENT, 0.0); /* 50/19 is 2.6 */
    b.model->soils[0].cohesion = 0.0;
    kent_restraints *r = sized(&b);
    assert_false(kent_hand_says(at_b(&b, r), "passive coefficient"));
    finish(&b, r);

    b = main_in(KENT_BEARING_GRADIENT, 0.0);
    b.model->soils[0].cohesion = 0.0;
    b.model->soils[0].factor_inside = 2.0;
    r = sized(&b);
    kent_hand_expect(at_b(&b, r), "asks for a passive coefficient of 5.3");
    finish(&b, r);
}

/* ---- the hand calculation -------------------------------------------------------- */

/* Every route, dry and wet, with and without cohesion and a factor inside. */
static void every_line_of_every_route_follows_from_those_above(void **state)
{
    (void)state;
    static const kent_bearing_route routes[] = {
        KENT_BEARING_CONSTANT, KENT_BEARING_BY_DEPTH, KENT_BEARING_GRADIENT,
        KENT_BEARING_PASSIVE};
    for (int i = 0; i < 64; i++) {
        kent_build b = main_in(routes[i % 4], 0.0);
        kent_soil *s = &b.model->soils[0];
        s->allowable_bearing = 120e3;
        if (i & 4) b.model->ground.water_table = 1.2;
        if (i & 8) s->cohesion = 0.0;
        if (i & 16) s->factor_inside = 1.5;
        if (i & 32) b.model->ground.cover = 2.4; /* below the table's last row */
        kent_restraints *r = sized(&b);
        const kent_derivation *d = &at_b(&b, r)->derivation;
        const kent_line *q = kent_derivation_find(d, "q");
        assert_non_null(q);
        assert_close(q->value, at_b(&b, r)->allowable_bearing, 1e-15);
        assert_non_null(kent_derivation_find(d, "Ki"));
        (void)kent_hand_lines(d, KENT_SI);
        (void)kent_hand_lines(d, KENT_US);
        finish(&b, r);
    }
}

/* The axis lies at 1.81 m. Only passive pressure is worked out with ground water. */
static void a_stated_bearing_under_water_is_doubted(void **state)
{
    (void)state;
    static const kent_bearing_route routes[] = {
        KENT_BEARING_CONSTANT, KENT_BEARING_BY_DEPTH, KENT_BEARING_GRADIENT,
        KENT_BEARING_PASSIVE};
    for (size_t i = 0; i < sizeof routes / sizeof routes[0]; i++) {
        for (int wet = 0; wet < 2; wet++) {
            kent_build b = main_in(routes[i], 0.0);
            b.model->ground.cover = 1.5;
            b.model->soils[0].allowable_bearing = 100e3;
            b.model->ground.water_table = wet ? 1.80 : 1.82;
            kent_restraints *r = sized(&b);
            assert_int_equal(at_b(&b, r)->block.type, KENT_BLOCK_BEARING);
            assert_true(kent_hand_says(at_b(&b, r), "leans on ground under water") ==
                        (wet && routes[i] != KENT_BEARING_PASSIVE));
            finish(&b, r);
        }
    }
}

/* 20 degrees, no cohesion: Kp = 2.0396, at 1.81 m of 19 kN/m3 70.14 kPa. A stated
 * bearing q is filled up to a hundredth at a factor of 1.5, so that q/1.5 are put on.
 */
static void a_bearing_beyond_the_soils_own_strength_is_told(void **state)
{
    (void)state;
    static const double bearing[] = {104e3, 108e3};
    for (int i = 0; i < 2; i++) {
        kent_build b = main_in(KENT_BEARING_CONSTANT, 0.0);
        b.model->ground.cover = 1.5;
        b.model->soils[0].friction_angle = 20.0 * DEGREE;
        b.model->soils[0].cohesion = 0.0;
        b.model->soils[0].allowable_bearing = bearing[i];
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_b(&b, r);
        const double put = factored() / 1.5 / (h->block.width * h->block.height);
        assert_true((put > 70.14e3) == (i == 1));
        assert_true(kent_hand_says(h, "gives way at 70.1 kPa by its own") == (i == 1));
        finish(&b, r);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_stated_bearing_under_water_is_doubted),
        cmocka_unit_test(a_bearing_beyond_the_soils_own_strength_is_told),
        cmocka_unit_test(the_bearing_at_the_axis_sizes_the_face),
        cmocka_unit_test(deeper_ground_of_a_gradient_takes_a_smaller_face),
        cmocka_unit_test(above_the_first_row_of_a_table_there_is_no_block),
        cmocka_unit_test(passive_bearing_without_its_values_is_refused_by_their_names),
        cmocka_unit_test(where_a_table_bears_nothing_there_is_no_block),
        cmocka_unit_test(a_base_wants_a_bearing_of_its_own),
        cmocka_unit_test(a_catalogues_soil_is_to_be_taken_over_for_a_base),
        cmocka_unit_test(the_cover_that_would_serve_counts_on_deeper_ground),
        cmocka_unit_test(any_route_is_doubted_where_it_takes_too_much),
        cmocka_unit_test(every_line_of_every_route_follows_from_those_above),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
