/* The wedge of ground before a face, and blocks that would lean on something else. */
#include "kent_hand.h"
#include "kent_wedge.h"

#include <string.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 0.5e6}};

/* Rankine's wedge at 30 degrees: the plane rises at 30 degrees, so 2 m deep reach 2
 * sqrt(3) = 3.4641 m; 1 m on it is 1/sqrt(3) wider on each side. By hand. */
static void the_wedge_reaches_and_widens_by_the_angle_of_the_soil(void **state)
{
    (void)state;
    const kent_wedge wedge = {0.6, 0.5, 2.0, 30.0 * DEGREE, 0.0};
    assert_close(kent_wedge_reach(&wedge), 3.4641016151377544, 1e-12);
    assert_within(kent_wedge_clearance(&wedge, 4.6, 0.0), 4.0 - 3.4641016, 1e-6);
    assert_within(kent_wedge_clearance(&wedge, 4.0, 0.0), 0.0, 0.0);
    assert_within(kent_wedge_clearance(&wedge, 1.6, 2.0), 1.5 - 0.5773503, 1e-6);
    assert_within(kent_wedge_clearance(&wedge, 1.6, -2.0), 1.5 - 0.5773503, 1e-6);
    assert_within(kent_wedge_clearance(&wedge, 1.6, 1.0), 0.0, 0.0);
    assert_within(kent_wedge_clearance(&wedge, 0.3, 0.4), 0.0, 0.0); /* before it */
    assert_within(kent_wedge_clearance(&wedge, -1.0, 0.0), 1.0, 1e-12);
    assert_within(kent_wedge_clearance(&wedge, 0.0, 0.7), 0.2, 1e-12);

    const kent_wedge loose = {0.6, 0.5, 2.0, 0.0, 0.0};
    assert_close(kent_wedge_reach(&loose), 2.0, 1e-12);
}

/* ---- blocks ---------------------------------------------------------------------- */

static kent_obstacle at_angle(double along, double across)
{
    kent_obstacle o = {.distance = hypot(along, across), .depth = 2.5};
    (void)snprintf(o.what, sizeof o.what, "sewer");
    o.direction = kent_vec3_unit((kent_vec3){along, across, 0.0});
    return o;
}

/* A main along x that ends blank at E, 620 mm outside, cover 1.5 m: pushed along +x by
 * 0.75 x 302 kN. One obstacle, along and across of E (m). */
static kent_build main_that_ends(double phi, kent_restraint_choice choice)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -300.0, 0.0, 50.0);
    (void)kent_build_point(&b, "E", 0.0, 0.0, 50.0);
    (void)kent_build_pipe(&b, "P", "A E", 0.6, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    b.model->loads.test_pressure = 0.5e6;
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    b.model->soils[0].friction_angle = phi;
    b.model->ground.water_table = (double)INFINITY;
    const int note = kent_build_note(&b, "E");
    b.model->notes[note].restraint = (int)choice;
    return b;
}

static void put_obstacle(kent_build *b, double along, double across)
{
    b->model->obstacles = kent_alloc(1, sizeof *b->model->obstacles);
    assert_non_null(b->model->obstacles);
    b->model->obstacles[0] = at_angle(along, across);
    b->model->obstacle_count = 1;
    b->model->notes[0].obstacle_first = 0;
    b->model->notes[0].obstacle_count = 1;
}

/* Whether E is held with an obstacle there; words: said of it. */
static bool held_with(double phi, kent_restraint_choice choice, double along,
                      double across, const char *words)
{
    kent_build b = main_that_ends(phi, choice);
    put_obstacle(&b, along, across);
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "E")];
    const bool held = h->held;
    assert_true(held == (h->block.type != KENT_BLOCK_NONE));
    assert_int_equal(r->not_held, held ? 0 : 1);
    assert_true((kent_derivation_find(&h->derivation, "R") != NULL) == held);
    (void)kent_hand_lines(&h->derivation, KENT_SI);
    kent_hand_expect(h, words);
    kent_restraints_free(r);
    kent_build_clear(&b);
    return held;
}

/* The block without any obstacle: its face, and how far the wedge reaches. */
static kent_block block_alone(void)
{
    kent_build b = main_that_ends(30.0 * DEGREE, KENT_THRUST_BLOCK);
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_block block = r->fittings[kent_build_fitting_of(&b, "E")].block;
    assert_int_equal(block.type, KENT_BLOCK_BEARING);
    assert_close(block.bearing_area, 1.5 * 0.5e6 * 0.25 * PI * 0.62 * 0.62 / 150e3,
                 1e-9);
    kent_restraints_free(r);
    kent_build_clear(&b);
    return block;
}

static void a_block_leans_on_nothing_but_ground(void **state)
{
    (void)state;
    const kent_block b = block_alone();
    const double front = 0.31 + b.thickness;
    const double reach = (1.81 + 0.5 * b.height) * sqrt(3.0);
    const double phi = 30.0 * DEGREE;
    const char *clear = "'sewer' is clear of the ground that the face leans on by 0.0";
    const char *inside = "no block: its face would lean on 'sewer'";

    assert_true(held_with(phi, KENT_THRUST_BLOCK, front + reach + 0.02, 0.0, clear));
    assert_false(held_with(phi, KENT_THRUST_BLOCK, front + reach - 0.02, 0.0, inside));
    for (int side = -1; side <= 1; side += 2) {
        const double half = 0.5 * b.width + 1.0 / sqrt(3.0);
        assert_true(held_with(phi, KENT_THRUST_BLOCK, front + 1.0, side * (half + 0.02),
                              clear));
        assert_false(held_with(phi, KENT_THRUST_BLOCK, front + 1.0,
                               side * (half - 0.02), inside));
    }
}

/* At 30 degrees a wedge 2 m deep is 1 m wide at the face and 1 + 2 x 2 m at its end
 * (2 sqrt(3)/sqrt(3) = 2 on either side): 2.5 m beside the thrust, 4.06 m ahead. */
static void what_runs_on_beside_a_face_crosses_its_wedge_farther_along(void **state)
{
    (void)state;
    const kent_wedge wedge = {0.6, 0.5, 2.0, 30.0 * DEGREE, 0.0};
    assert_close(kent_wedge_farthest(&wedge, 0.0, 1.0), 2.5, 1e-12);
    assert_close(kent_wedge_farthest(&wedge, 0.0, -1.0), 2.5, 1e-12);
    assert_close(kent_wedge_farthest(&wedge, 1.0, 0.0), 0.6 + 2.0 * sqrt(3.0), 1e-12);
    assert_close(kent_wedge_farthest(&wedge, -1.0, 0.0), -0.6, 1e-12);

    const kent_block b = block_alone();
    const double beside = 0.5 * b.width + 1.81 + 0.5 * b.height;
    const double phi = 30.0 * DEGREE;
    assert_true(held_with(phi, KENT_THRUST_BLOCK, 0.0, -(beside - 0.02), "if it runs"));
    assert_true(held_with(phi, KENT_THRUST_BLOCK, 0.0, beside - 0.02, "if it runs on"));
    kent_build c = main_that_ends(phi, KENT_THRUST_BLOCK);
    put_obstacle(&c, 0.0, beside + 0.02);
    kent_build_derive(&c);
    kent_restraints *r = kent_hand_size(&c, TEST, 1);
    const kent_holding *h = &r->fittings[kent_build_fitting_of(&c, "E")];
    assert_true(kent_hand_says(h, "'sewer' is clear"));
    assert_false(kent_hand_says(h, "if it runs on"));
    kent_restraints_free(r);
    kent_build_clear(&c);
}

static void
what_stands_behind_counts_only_for_a_block_that_holds_both_ways(void **state)
{
    (void)state;
    assert_true(held_with(30.0 * DEGREE, KENT_THRUST_BLOCK, -2.0, 0.0, "is clear"));
    assert_false(held_with(30.0 * DEGREE, KENT_ANCHOR_BLOCK, -2.0, 0.0, "no block"));
}

/* At 40 degrees the wedge is longer; where the angle is not given, 30 degrees. */
static void the_angle_of_the_soil_counts_and_an_assumed_one_is_said(void **state)
{
    (void)state;
    const kent_block b = block_alone();
    const double there = 0.31 + b.thickness + (1.81 + 0.5 * b.height) * sqrt(3.0) + 0.1;
    assert_true(held_with(30.0 * DEGREE, KENT_THRUST_BLOCK, there, 0.0, "by 0.10 m"));
    assert_false(held_with(40.0 * DEGREE, KENT_THRUST_BLOCK, there, 0.0, "'sewer'"));
    assert_true(held_with((double)NAN, KENT_THRUST_BLOCK, there, 0.0, "by 0.10 m"));
    assert_false(held_with((double)NAN, KENT_THRUST_BLOCK, 2.0, 0.0,
                           "friction angle not given, 30.0° is taken"));
}

static void a_refusal_says_where_and_the_ways_out(void **state)
{
    (void)state;
    assert_false(held_with(30.0 * DEGREE, KENT_THRUST_BLOCK, 2.0, 0.0,
                           "'sewer', 2.00 m from the fitting and 2.50 m deep"));
    assert_false(held_with(30.0 * DEGREE, KENT_THRUST_BLOCK, 2.0, 0.0,
                           "move one of them, or restrained joints"));
}

/* What rubs on the face makes the plane flatter: at 30 and 20 degrees 18.1 in place of
 * 30, so that the wedge reaches 3.06 in place of 1.73 times its depth. A soil that goes
 * by another bearing counts on none of that. */
static void friction_on_the_face_makes_its_wedge_reach_farther(void **state)
{
    (void)state;
    for (int pass = 0; pass < 3; pass++) {
        kent_build b = main_that_ends(30.0 * DEGREE, KENT_THRUST_BLOCK);
        kent_soil *s = &b.model->soils[0];
        s->cohesion = 0.0;
        s->passive_share = 1.0;
        s->wall_friction = 20.0 * DEGREE;
        if (pass < 2) s->route = KENT_BEARING_PASSIVE;
        const double reach = (pass < 2 ? 3.0584 : 1.7321) * (1.81 + 0.5 * 1.0);
        const double front = 0.31 + 0.45; /* of a face 1 m high, or lower by a little */
        put_obstacle(&b, front + reach + (pass == 1 ? -1.0 : 0.4), 0.0);
        kent_build_derive(&b);
        kent_restraints *r = kent_hand_size(&b, TEST, 1);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "E")];
        assert_true(h->held == (pass != 1));
        (void)kent_hand_lines(&h->derivation, KENT_SI);
        assert_true((kent_derivation_find(&h->derivation, "psi") != NULL) ==
                    (pass == 0));
        if (h->held) {
            const double base = 1.81 + 0.5 * h->block.face.height;
            assert_close(kent_wedge_reach(&h->footprint.wedge),
                         (pass < 2 ? 3.0584 : sqrt(3.0)) * base, 1e-4);
        }
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(what_runs_on_beside_a_face_crosses_its_wedge_farther_along),
        cmocka_unit_test(the_wedge_reaches_and_widens_by_the_angle_of_the_soil),
        cmocka_unit_test(a_block_leans_on_nothing_but_ground),
        cmocka_unit_test(
            what_stands_behind_counts_only_for_a_block_that_holds_both_ways),
        cmocka_unit_test(the_angle_of_the_soil_counts_and_an_assumed_one_is_said),
        cmocka_unit_test(friction_on_the_face_makes_its_wedge_reach_farther),
        cmocka_unit_test(a_refusal_says_where_and_the_ways_out),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
