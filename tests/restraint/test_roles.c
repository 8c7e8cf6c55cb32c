/* Fittings that are held in ways of their own: curves, tapping sleeves, hydrants,
 * groups.
 */
#include "kent_hand.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6}};

static void finish(kent_build *b, kent_restraints *r)
{
    kent_restraints_free(r);
    kent_build_clear(b);
}

/* ---- curves ---------------------------------------------------------------------- */

/* 620 mm outside, cover 1.5 m, 150 kPa; turns by 22.5 degrees at C along an arc. The
 * derived fitting is made a curve here, as a route that follows one makes it. */
static kent_build main_that_curves(double radius, double rise)
{
    kent_build b = kent_build_new();
    const double turn = 22.5 * DEGREE;
    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 0.0, 0.0, 50.0 + rise);
    (void)kent_build_point(&b, "E", 200.0 * cos(turn), 200.0 * sin(turn), 50.0);
    (void)kent_build_pipe(&b, "P", "A C E", 0.6, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "E", 0.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    b.model->ground.water_table = (double)INFINITY;
    b.model->loads.test_pressure = 1.0e6;
    kent_build_derive(&b);
    kent_fitting *f = &b.model->fittings[kent_build_fitting_of(&b, "C")];
    f->type = KENT_CURVE;
    f->restraint = KENT_NO_RESTRAINT;
    f->curve_radius = radius;
    f->curve_length = radius * f->angle;
    return b;
}

static const kent_holding *at_c(const kent_build *b, const kent_restraints *r)
{
    return &r->fittings[kent_build_fitting_of(b, "C")];
}

/* A pull S round a radius R presses with S/R per metre (thin rings; any textbook of
 * statics): 1.5 x 302 kN / R on 150 kPa x 0.62 m, whatever the angle. */
static void
a_curve_presses_on_the_soil_beside_it_with_its_pull_over_its_radius(void **state)
{
    (void)state;
    const double pull = 1.5 * 1.0e6 * 0.25 * PI * 0.62 * 0.62;
    const double limit = pull / (150e3 * 0.62); /* m, 4.87 */
    for (int i = 0; i < 3; i++) {
        const double radius = limit * (i == 0 ? 20.0 : i == 1 ? 1.001 : 0.999);
        kent_build b = main_that_curves(radius, 0.0);
        kent_restraints *r = kent_hand_size(&b, TEST, 1);
        const kent_holding *h = at_c(&b, r);
        assert_close(h->utilisation, limit / radius, 1e-9);
        assert_close(h->factor_reached, 1.5 * radius / limit, 1e-9);
        assert_true(h->held == (i < 2));
        assert_int_equal(h->block.type, KENT_BLOCK_NONE);
        assert_int_equal(r->not_held, h->held ? 0 : 1);
        if (h->held) {
            kent_hand_expect(h, "presses on the fill beside the pipe");
            assert_false(kent_hand_says(h, "nothing holds"));
        } else {
            kent_hand_expect(h, "lay it to a radius of 4.87 m or more");
        }
        finish(&b, r);
    }
    assert_close(kent_curve_side_load(2.0 * pull * sin(0.2), 0.4, 100.0), pull / 100.0,
                 1e-12);
}

static void a_curve_that_cannot_be_judged_is_not_held(void **state)
{
    (void)state;
    kent_build b = main_that_curves(100.0, 10.0); /* a crest, too */
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    assert_false(at_c(&b, r)->held);
    kent_hand_expect(at_c(&b, r), "up or down too, which is not judged");
    finish(&b, r);

    b = main_that_curves(100.0, 0.0);
    b.model->soils[0].unreliable = true;
    r = kent_hand_size(&b, TEST, 1);
    assert_false(at_c(&b, r)->held);
    kent_hand_expect(at_c(&b, r), "that soil, 'till', gives nothing");
    finish(&b, r);

    b = main_that_curves(100.0, 0.0);
    b.model->fittings[kent_build_fitting_of(&b, "C")].soil = -1;
    r = kent_hand_size(&b, TEST, 1);
    assert_false(at_c(&b, r)->held);
    kent_hand_expect(at_c(&b, r), "that soil is not stated");
    finish(&b, r);
}

/* What the trench is filled with, where the case states it, and ground that falls away
 * to the side that is pushed, here -y and a little +x: 8 degrees leave 0.783 of 30
 * degrees' (2.349 of 3, 21.2). */
static void a_curve_leans_on_its_fill_and_on_no_slope(void **state)
{
    (void)state;
    static const struct {
        double fill, falls; /* Pa, degrees; fill 0: none is stated */
        const char *words;
        bool held;
    } rows[] = {
        {0.0, 0.0, "is taken to bear as much as soil 'till'", true},
        {60e3, 0.0, "of soil 'fill' and the ground behind it the weaker", true},
        {-1.0, 0.0, "the fill beside it is not stated, or bears nothing", false},
        {0.0, 8.0, "the ground before the face falls by 8.0", true},
        {0.0, 11.0, "these rules allow 10.0", false}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        kent_build b = main_that_curves(100.0, 0.0);
        kent_fitting *f = &b.model->fittings[kent_build_fitting_of(&b, "C")];
        const double pull = 1.5 * 1.0e6 * 0.25 * PI * 0.62 * 0.62;
        double bears = rows[i].fill > 0.0 ? 60e3 : 150e3;
        b.model->soils[0].friction_angle = 30.0 * DEGREE;
        b.model->rules.steepest_ground = 10.0 * DEGREE;
        if (rows[i].fill != 0.0) {
            f->backfill = kent_build_soil(&b, "fill", fabs(rows[i].fill), 18e3, 1.5);
            b.model->soils[f->backfill].unreliable = rows[i].fill < 0.0;
        }
        if (rows[i].falls > 0.0) {
            const double side = (-90.0 + 11.25) * DEGREE;
            f->stated.slope =
                (kent_slope){{cos(side), sin(side), 0.0}, rows[i].falls * DEGREE};
            bears *= 0.7829; /* by hand */
        }
        kent_restraints *r = kent_hand_size(&b, TEST, 1);
        assert_true(at_c(&b, r)->held == rows[i].held);
        kent_hand_expect(at_c(&b, r), rows[i].words);
        if (rows[i].held) {
            assert_close(at_c(&b, r)->utilisation, pull / 100.0 / (bears * 0.62), 1e-3);
        }
        finish(&b, r);
    }
}

static void the_bearing_beside_a_curve_is_doubted_as_any_other(void **state)
{
    (void)state;
    kent_build b = main_that_curves(100.0, 0.0);
    b.model->soils[0].allowable_bearing = 300e3; /* on 19 kN/m3 x 1.81 m: 8.7 */
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    kent_hand_expect(at_c(&b, r), "asks for a passive coefficient of 8.7");
    finish(&b, r);
}

static void what_stands_near_a_curve_is_told(void **state)
{
    (void)state;
    kent_build b = main_that_curves(100.0, 0.0);
    b.model->obstacles = kent_alloc(1, sizeof *b.model->obstacles);
    assert_non_null(b.model->obstacles);
    b.model->obstacles[0] = (kent_obstacle){
        .what = "cellar", .distance = 1.0, .depth = 2.0, .direction = {0, -1, 0}};
    b.model->obstacle_count = 1;
    b.model->fittings[kent_build_fitting_of(&b, "C")].obstacle_count = 1;
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    kent_hand_expect(at_c(&b, r), "'cellar' stands near");
    finish(&b, r);
}

static void every_line_of_a_curve_follows_from_those_above(void **state)
{
    (void)state;
    kent_build b = main_that_curves(100.0, 0.0);
    b.model->soils[0].factor_inside = 1.5;
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_derivation *d = &at_c(&b, r)->derivation;
    assert_non_null(kent_derivation_find(d, "ws"));
    assert_true(kent_hand_lines(d, KENT_SI) > 10);
    assert_true(kent_hand_lines(d, KENT_US) > 10);
    finish(&b, r);
}

/* ---- what serves a branch -------------------------------------------------------- */

/* A tee at T off a main along x, with what its note says of it. */
static kent_build main_with_branch(kent_role role, kent_restraint_choice choice,
                                   kent_joint joint)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "T", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "S", 0.0, 100.0, 50.0);
    const int run = kent_build_pipe(&b, "P", "A T E", 0.6, 1000.0);
    const int branch = kent_build_pipe(&b, "Q", "T S", 0.2, 1000.0);
    b.model->pipes[run].joint = joint;
    b.model->pipes[branch].material_density = 7050.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "E", 0.0);
    (void)kent_build_outflow(&b, "S", 0.0);
    const int t = kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    kent_soil *till = &b.model->soils[t];
    till->friction_angle = 30.0 * DEGREE;
    till->cohesion = 0.0;
    till->friction_ratio = 0.75;
    b.model->ground.water_table = (double)INFINITY;
    const int note = kent_build_note(&b, "T");
    b.model->notes[note].role = role;
    b.model->notes[note].restraint = (int)choice;
    kent_build_derive(&b);
    return b;
}

static const kent_holding *at_t(const kent_build *b, const kent_restraints *r)
{
    return &r->fittings[kent_build_fitting_of(b, "T")];
}

static void a_sleeve_on_an_old_main_is_held_by_a_block_or_not_at_all(void **state)
{
    (void)state;
    static const struct {
        kent_role role;
        kent_restraint_choice choice;
        kent_joint joint;
        bool held;
        size_t legs;
    } rows[] = {
        {KENT_ROLE_TAPPING, KENT_RESTRAINED_JOINTS, KENT_PUSH_ON, false, 0},
        {KENT_ROLE_TAPPING, KENT_THRUST_BLOCK, KENT_PUSH_ON, true, 0},
        {KENT_ROLE_TAPPING, KENT_RESTRAINED_JOINTS, KENT_WELDED, true, 1},
        {KENT_ROLE_NONE, KENT_RESTRAINED_JOINTS, KENT_PUSH_ON, true, 1},
    };
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        kent_build b = main_with_branch(rows[i].role, rows[i].choice, rows[i].joint);
        kent_restraints *r = kent_hand_size(&b, TEST, 1);
        const kent_holding *h = at_t(&b, r);
        assert_true(h->held == rows[i].held);
        assert_int_equal(h->leg_count, rows[i].legs);
        assert_true(kent_hand_says(h, "do not hold a tapping sleeve") == !h->held);
        finish(&b, r);
    }
}

static void without_a_pipe_a_branch_has_no_joints_to_restrain(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "T", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 50.0);
    (void)kent_build_pipe(&b, "P", "A T E", 0.6, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_fixed_level(&b, "E", 150.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    const int index = kent_build_note(&b, "T");
    kent_fitting_note *note = &b.model->notes[index];
    note->restraint = KENT_RESTRAINED_JOINTS;
    note->branch.end = KENT_BRANCH_BLANK;
    note->branch.joint = KENT_PUSH_ON; /* so that the end pushes on the tee */
    note->branch.outside_diameter = 0.17;
    note->branch.direction = (kent_vec3){0.0, 1.0, 0.0};
    b.model->loads.test_pressure = 1.0e6;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    assert_false(at_t(&b, r)->held);
    kent_hand_expect(at_t(&b, r), "the branch is no pipe of the case; write restraint "
                                  "= \"thrust-block\"");
    finish(&b, r);
}

static void a_sleeve_that_no_block_holds_is_offered_no_joints(void **state)
{
    (void)state;
    kent_build b = main_with_branch(KENT_ROLE_TAPPING, KENT_THRUST_BLOCK, KENT_PUSH_ON);
    b.model->fittings[kent_build_fitting_of(&b, "T")].cover = 0.3;
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = at_t(&b, r);
    assert_false(h->held);
    kent_hand_expect(h, "lay the main that deep, or a structure of its own");
    assert_false(kent_hand_says(h, "or restrained joints"));
    finish(&b, r);
}

static void beside_a_hydrant_the_drain_stays_free(void **state)
{
    (void)state;
    for (int hydrant = 0; hydrant < 2; hydrant++) {
        kent_build b = main_with_branch(hydrant ? KENT_ROLE_HYDRANT : KENT_ROLE_NONE,
                                        KENT_THRUST_BLOCK, KENT_PUSH_ON);
        kent_restraints *r = kent_hand_size(&b, TEST, 1);
        assert_true(kent_hand_says(at_t(&b, r), "clear of the hydrant's drain") ==
                    (hydrant > 0));
        finish(&b, r);
    }
}

/* ---- groups ---------------------------------------------------------------------- */

/* A to B, 45 degrees left to C 1.5 m on, then to E at x, y; B and C are one. */
static kent_build two_bends(double x, double y)
{
    const double half = 1.5 * sqrt(0.5);
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "B", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", half, half, 50.0);
    (void)kent_build_point(&b, "E", x, y, 50.0);
    (void)kent_build_pipe(&b, "P", "A B C E", 0.2, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "E", 0.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    b.model->ground.water_table = (double)INFINITY;
    const int note = kent_build_note(&b, "B");
    b.model->together = kent_alloc(1, sizeof *b.model->together);
    assert_non_null(b.model->together);
    b.model->together[0] = 2;
    b.model->together_count = 1;
    b.model->notes[note].together_first = 0;
    b.model->notes[note].together_count = 1;
    kent_build_derive(&b);
    return b;
}

/* Two bends of 45 degrees, 1.5 m apart and named as one, turn the main by 90 degrees:
 * one block for p A sqrt(2), pushed along the outer bisector; a leg each way for all of
 * it. */
static void two_bends_as_one_get_one_block_for_the_sum(void **state)
{
    (void)state;
    const double half = 1.5 * sqrt(0.5);
    kent_build b = two_bends(half, 200.0);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const int f = kent_build_fitting_of(&b, "B");
    const kent_holding *h = &r->fittings[f];
    const double thrust = 1.0e6 * 0.25 * PI * 0.22 * 0.22 * sqrt(2.0);

    assert_int_equal(b.model->fittings[f].type, KENT_GROUP);
    assert_true(h->held);
    assert_int_equal(h->block.type, KENT_BLOCK_BEARING);
    assert_close(h->design_thrust, 1.5 * thrust, 1e-9);
    assert_close(h->block.bearing_area, 1.5 * thrust / 150e3, 1e-9);
    assert_false(kent_hand_says(h, "couple")); /* their sum runs through the middle */
    finish(&b, r);
}

/* Turned back by the second bend: no thrust, but p A x 1.0607 m = 40.3 kN m. */
static void an_offset_is_not_held_by_one_block(void **state)
{
    (void)state;
    const double half = 1.5 * sqrt(0.5);
    kent_build b = two_bends(200.0, half);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];

    assert_false(h->needs_nothing || h->held);
    assert_true(h->unbalanced);
    assert_int_equal(r->not_held, 1);
    kent_hand_expect(h, "leave a couple of 40.3 kN m before any factor");
    kent_hand_expect(h, "Write apart = true");
    finish(&b, r);
}

/* The main goes on at an angle a, so that T = 2 p A sin(a/2) acts along the
 * bisector through the crossing of the outer legs; by hand, with p A = 38.01 kN and the
 * bends at (0, 0) and (1.0607, 1.0607), 0.75 + 0.11 m from the middle to the outside:
 * 45 and 22.5 turned back meet at (-1.500, 0), their force passes the middle at 2.09 m;
 * 45 and 11.25 on the same hand meet at (0.352, 0), at 0.41 m. */
static void a_force_that_runs_past_a_group_is_not_held(void **state)
{
    (void)state;
    static const struct {
        double turns; /* degrees, of the second bend */
        bool held;
    } rows[] = {{-45.0, false}, {-40.0, false}, {-22.5, false}, {11.25, true}};
    const double half = 1.5 * sqrt(0.5);
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        const double on = (45.0 + rows[i].turns) * DEGREE;
        kent_build b = two_bends(half + 200.0 * cos(on), half + 200.0 * sin(on));
        kent_restraints *r = kent_hand_size(&b, TEST, 1);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
        assert_true(h->held == rows[i].held);
        assert_true(h->unbalanced == !rows[i].held);
        assert_int_equal(r->not_held, rows[i].held ? 0 : 1);
        finish(&b, r);
    }
}

/* Two mains side by side, joined by nothing, that turn at B and Q by 90 degrees, the
 * second one the same way or the other: 53.7 kN each, and together twice that or,
 * pushed against each other, nothing; one may be drained. */
static void mains_pressed_one_at_a_time_are_not_held_against_each_other(void **state)
{
    (void)state;
    for (int against = 0; against < 2; against++) {
        const double way = against ? -1.0 : 1.0;
        kent_build b = kent_build_new();
        (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
        (void)kent_build_point(&b, "B", 0.0, 0.0, 50.0);
        (void)kent_build_point(&b, "C", 0.0, 200.0, 50.0);
        (void)kent_build_point(&b, "P", 0.5 - way * 200.0, -0.5, 50.0);
        (void)kent_build_point(&b, "Q", 0.5, -0.5, 50.0);
        (void)kent_build_point(&b, "E", 0.5, -0.5 + way * 200.0, 50.0);
        (void)kent_build_pipe(&b, "M", "A B C", 0.2, 1000.0);
        (void)kent_build_pipe(&b, "N", "P Q E", 0.2, 1000.0);
        (void)kent_build_fixed_level(&b, "A", 60.0);
        (void)kent_build_fixed_level(&b, "P", 80.0);
        (void)kent_build_outflow(&b, "C", 0.0);
        (void)kent_build_outflow(&b, "E", 0.0);
        (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
        b.model->ground.water_table = (double)INFINITY;
        const int note = kent_build_note(&b, "B");
        b.model->together = kent_alloc(1, sizeof *b.model->together);
        assert_non_null(b.model->together);
        b.model->together[0] = 4;
        b.model->together_count = b.model->notes[note].together_count = 1;
        kent_build_derive(&b);
        kent_restraints *r = kent_hand_size(&b, TEST, 1);
        const kent_fitting *f = &b.model->fittings[kent_build_fitting_of(&b, "B")];
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
        assert_true(f->parted);
        assert_true(h->unbalanced == (against > 0) && h->held == (against == 0));
        if (against) {
            kent_hand_expect(h, "alone one pushes with 80.6 kN factored");
        } else {
            kent_hand_expect(h, "each may be under pressure without the others");
        }
        finish(&b, r);
    }
}

/* ---- factors --------------------------------------------------------------------- */

static const char *says_of_factor(double of_test, double all)
{
    static char says[sizeof((kent_line *)NULL)->says];
    const double half = 1.5 * sqrt(0.5);
    kent_build b = two_bends(half, 200.0);
    b.model->rules.factor_test = of_test;
    b.model->loads.factor[KENT_CASE_TEST] = all;
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
    says[0] = '\0';
    for (size_t i = 0; i < h->derivation.count && says[0] == '\0'; i++) {
        const kent_line *line = &h->derivation.lines[i]; /* where it stands first */
        if (strcmp(line->symbol, "SF") != 0) continue;
        (void)snprintf(says, sizeof says, "%s", line->says);
    }
    finish(&b, r);
    return says;
}

static void a_factor_of_the_rules_for_the_test_is_named(void **state)
{
    (void)state;
    const double no = (double)NAN;
    assert_string_equal(says_of_factor(1.25, no),
                        "factor of the design rules for the site test");
    assert_string_equal(says_of_factor(1.25, 1.4), "factor of this load case");
    assert_string_equal(says_of_factor(no, no), "factor of this load case");
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(what_stands_near_a_curve_is_told),
        cmocka_unit_test(
            a_curve_presses_on_the_soil_beside_it_with_its_pull_over_its_radius),
        cmocka_unit_test(a_curve_that_cannot_be_judged_is_not_held),
        cmocka_unit_test(a_curve_leans_on_its_fill_and_on_no_slope),
        cmocka_unit_test(the_bearing_beside_a_curve_is_doubted_as_any_other),
        cmocka_unit_test(every_line_of_a_curve_follows_from_those_above),
        cmocka_unit_test(a_sleeve_on_an_old_main_is_held_by_a_block_or_not_at_all),
        cmocka_unit_test(without_a_pipe_a_branch_has_no_joints_to_restrain),
        cmocka_unit_test(a_sleeve_that_no_block_holds_is_offered_no_joints),
        cmocka_unit_test(beside_a_hydrant_the_drain_stays_free),
        cmocka_unit_test(two_bends_as_one_get_one_block_for_the_sum),
        cmocka_unit_test(an_offset_is_not_held_by_one_block),
        cmocka_unit_test(mains_pressed_one_at_a_time_are_not_held_against_each_other),
        cmocka_unit_test(a_force_that_runs_past_a_group_is_not_held),
        cmocka_unit_test(a_factor_of_the_rules_for_the_test_is_named),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
