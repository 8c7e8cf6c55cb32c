/* Who stands near whom. */
#include "kent_convex.h"
#include "kent_hand.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 0.2e6}};

/* ---- figures --------------------------------------------------------------------- */

/* Squares of 2 m, by hand: shifted by 1 m along both they share 1 m2; turned by 45
 * degrees about one centre, an octagon of 8 (sqrt(2) - 1) = 3.3137 m2. */
static void figures_share_and_lie_apart_as_by_hand(void **state)
{
    (void)state;
    const double turned = sqrt(0.5);
    const kent_taper square = {0.0, 0.0, 1.0, 0.0, -1.0, 1.0, 1.0, 1.0};
    const kent_taper shifted = {1.0, 1.0, 0.0, 1.0, -1.0, 1.0, 1.0, 1.0};
    const kent_taper rotated = {0.0, 0.0, turned, turned, -1.0, 1.0, 1.0, 1.0};
    const kent_taper away = {5.0, 6.0, -1.0, 0.0, -1.0, 1.0, 1.0, 1.0};
    const kent_taper wide = {0.0, 0.0, 1.0, 0.0, 0.0, 3.0, 1.0, 2.0};
    const kent_convex a = kent_convex_taper(&square), b = kent_convex_taper(&shifted);
    const kent_convex c = kent_convex_taper(&rotated), d = kent_convex_taper(&away);
    const kent_convex e = kent_convex_taper(&wide);

    assert_close(kent_convex_area(&a), 4.0, 1e-12);
    assert_close(kent_convex_area(&e), 9.0, 1e-12);
    assert_close(kent_convex_shared(&a, &b), 1.0, 1e-12);
    assert_close(kent_convex_shared(&b, &a), 1.0, 1e-12);
    assert_close(kent_convex_shared(&a, &c), 8.0 * (sqrt(2.0) - 1.0), 1e-12);
    assert_within(kent_convex_shared(&a, &d), 0.0, 0.0);
    assert_close(kent_convex_gap(&a, &d), 5.0, 1e-12); /* 3 along, 4 across */
    assert_within(kent_convex_gap(&a, &b), 0.0, 0.0);
}

/* ---- mains ----------------------------------------------------------------------- */

/* Two mains of 620 mm along x that end blank facing each other, `apart` m from end to
 * end and `beside` m to the side. */
static kent_build ends_facing(double apart, double beside)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -300.0, 0.0, 50.0);
    (void)kent_build_point(&b, "E", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "G", apart, beside, 50.0);
    (void)kent_build_point(&b, "Z", apart + 300.0, beside, 50.0);
    (void)kent_build_pipe(&b, "P", "A E", 0.6, 1000.0);
    (void)kent_build_pipe(&b, "Q", "Z G", 0.6, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_fixed_level(&b, "Z", 150.0);
    b.model->loads.test_pressure = 0.2e6;
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    b.model->ground.water_table = (double)INFINITY;
    b.model->soils[0].friction_angle = PI / 6.0;
    static const char *const ends[] = {"E", "G"};
    for (int i = 0; i < 2; i++) {
        const int note = kent_build_note(&b, ends[i]);
        b.model->notes[note].restraint = (int)KENT_THRUST_BLOCK;
    }
    return b;
}

static kent_restraints *sized(kent_build *b)
{
    kent_build_derive(b);
    return kent_hand_size(b, TEST, 1);
}

/* The first neighbour of a fitting; NULL. */
static const kent_neighbour *near_to(const kent_build *b, const kent_restraints *r,
                                     const char *id, size_t *count)
{
    return kent_space_of(&r->space, (size_t)kent_build_fitting_of(b, id), count);
}

static void finish(kent_build *b, kent_restraints *r)
{
    kent_restraints_free(r);
    kent_build_clear(b);
}

/* Face to face each block stands 0.31 m + t before its end, and its ground reaches R
 * beyond: they collide, stand in each other's ground, share it, or neither, by the
 * distance. */
static void blocks_face_to_face_collide_share_ground_or_do_not_meet(void **state)
{
    (void)state;
    kent_build b = ends_facing(100.0, 0.0);
    kent_restraints *r = sized(&b);
    const kent_footprint at = r->fittings[kent_build_fitting_of(&b, "E")].footprint;
    const double reach = kent_wedge_reach(&at.wedge);
    size_t count = 0;
    assert_true(at.placed && at.leans && !at.both_ways);
    assert_null(near_to(&b, r, "E", &count));
    assert_int_equal(r->space.count, 0);
    finish(&b, r);

    const struct {
        double apart;
        kent_meeting how;
        const char *words;
    } rows[] = {
        {2.0 * at.front - 0.1, KENT_MEETS_BODY,
         "take up the same place: make them one"},
        {2.0 * at.front + 0.1, KENT_MEETS_OPENED,
         "stands in the ground that this leans"},
        {2.0 * at.front + reach + 0.1, KENT_MEETS_SHARED, "lean on the same ground"}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        static const char *const ends[] = {"E", "G"};
        b = ends_facing(rows[i].apart, 0.0);
        r = sized(&b);
        for (int k = 0; k < 2; k++) {
            const kent_neighbour *n = near_to(&b, r, ends[k], &count);
            assert_non_null(n);
            assert_int_equal(n->how, rows[i].how);
            assert_int_equal(n->other, kent_build_fitting_of(&b, ends[1 - k]));
            assert_within(n->clear, fmax(0.0, rows[i].apart - 2.0 * at.front), 1e-5);
            kent_hand_expect(&r->fittings[kent_build_fitting_of(&b, ends[k])],
                             rows[i].words);
        }
        assert_true(kent_hand_says(&r->fittings[kent_build_fitting_of(&b, "E")],
                                   " apart: it does not bear both") ==
                    (rows[i].how == KENT_MEETS_SHARED));
        finish(&b, r);
    }
    b = ends_facing(2.0 * (at.front + reach) + 0.1, 0.0);
    r = sized(&b);
    assert_int_equal(r->space.count, 0);
    finish(&b, r);
}

/* One that holds from either side is as long behind the fitting as before it, and what
 * stands there stands in its place. */
static void a_block_that_holds_both_ways_is_there_behind_too(void **state)
{
    (void)state;
    for (int pass = 0; pass < 2; pass++) {
        kent_build b = ends_facing(-0.5, 1.0); /* G stands back to back with E */
        b.model->notes[0].restraint =
            pass ? (int)KENT_ANCHOR_BLOCK : (int)KENT_THRUST_BLOCK;
        kent_restraints *r = sized(&b);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "E")];
        size_t count = 0;
        assert_true(h->held && h->footprint.both_ways == (pass == 1));
        assert_close(h->footprint.behind, pass ? h->footprint.front : 0.0, 1e-12);
        const kent_neighbour *n = near_to(&b, r, "E", &count);
        assert_true((n && n->how == KENT_MEETS_BODY) == (pass == 1));
        finish(&b, r);
    }
}

/* Side by side the wedges widen by R tan 30 degrees: at 30 degrees by R/sqrt(3). */
static void wedges_meet_to_the_side_too(void **state)
{
    (void)state;
    kent_build b = ends_facing(100.0, 0.0);
    kent_restraints *r = sized(&b);
    const kent_footprint at = r->fittings[kent_build_fitting_of(&b, "E")].footprint;
    const double reach = kent_wedge_reach(&at.wedge);
    const double wide = at.half_width + reach / sqrt(3.0);
    finish(&b, r);

    for (int pass = 0; pass < 2; pass++) { /* their far ends at one line */
        b = ends_facing(2.0 * (at.front + reach) - 0.02,
                        2.0 * wide + (pass ? 0.1 : -0.1));
        r = sized(&b);
        assert_int_equal(r->space.count, pass ? 0 : 2);
        finish(&b, r);
    }
}

/* A main across the ground before E; then one beyond it; then above ground. */
static void another_main_through_the_ground_is_named(void **state)
{
    (void)state;
    kent_build b = ends_facing(100.0, 0.0);
    kent_restraints *r = sized(&b);
    const kent_footprint at = r->fittings[kent_build_fitting_of(&b, "E")].footprint;
    const double reach = kent_wedge_reach(&at.wedge);
    finish(&b, r);

    for (int pass = 0; pass < 3; pass++) {
        const double x = at.front + reach + 0.31 + (pass == 1 ? 0.05 : -0.05);
        size_t count = 0;
        b = ends_facing(100.0, 0.0);
        (void)kent_build_point(&b, "S", x, -200.0, 50.0);
        (void)kent_build_point(&b, "M", x, 30.0, 50.0);
        (void)kent_build_point(&b, "N", x, 200.0, 50.0);
        (void)kent_build_pipe(&b, "X", "S M N", 0.6, 1000.0);
        (void)kent_build_fixed_level(&b, "S", 150.0);
        (void)kent_build_outflow(&b, "N", 0.0);
        b.model->pipes[2].above_ground = pass == 2;
        r = sized(&b);
        const kent_neighbour *n = near_to(&b, r, "E", &count);
        assert_int_equal(count, pass == 0 ? 1 : 0);
        if (n) {
            assert_int_equal(n->how, KENT_MEETS_MAIN);
            assert_int_equal(n->pipe, 2);
            assert_close(n->clear, x, 1e-9);
            kent_hand_expect(&r->fittings[kent_build_fitting_of(&b, "E")],
                             "'X' runs through the ground that the block leans on");
        }
        finish(&b, r);
    }
}

/* A bend with restrained joints, turning left at B, is pushed to the right; a
 * main on that side lies in the ground that its trench leans on, one on the left does
 * not. */
static void a_main_beside_a_restrained_bend_is_named(void **state)
{
    (void)state;
    for (int pass = 0; pass < 3; pass++) {
        const double y = pass == 0 ? -1.5 : pass == 1 ? 1.5 : -5.0;
        kent_build b = kent_build_new();
        (void)kent_build_point(&b, "A", -300.0, 0.0, 50.0);
        (void)kent_build_point(&b, "V", -15.0, 0.0, 50.0);
        (void)kent_build_point(&b, "B", 0.0, 0.0, 50.0);
        (void)kent_build_point(&b, "C", 200.0, 200.0, 50.0);
        (void)kent_build_point(&b, "S", -300.0, y, 50.0);
        (void)kent_build_point(&b, "T", -1.0, y, 50.0);
        const int p = kent_build_pipe(&b, "P", "A V B C", 0.6, 1000.0);
        b.model->pipes[p].unit_mass = 150.0;
        (void)kent_build_pipe(&b, "Q", "S T", 0.6, 1000.0);
        (void)kent_build_fixed_level(&b, "A", 150.0);
        (void)kent_build_fixed_level(&b, "S", 150.0);
        (void)kent_build_outflow(&b, "C", 0.0);
        b.model->loads.test_pressure = 0.2e6;
        (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
        kent_soil *s = &b.model->soils[0];
        s->friction_angle = PI / 6.0;
        s->cohesion = 0.0;
        s->friction_ratio = 0.7;
        s->adhesion_ratio = 0.0;
        s->passive_ratio = 0.5;
        const int note = kent_build_note(&b, "B");
        b.model->notes[note].restraint = (int)KENT_RESTRAINED_JOINTS;
        kent_restraints *r = sized(&b);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
        assert_true(h->held && h->footprint.pipe_leans);
        assert_close(h->footprint.side_reach, (1.81 + 0.31) * sqrt(3.0), 1e-9);
        assert_true(kent_hand_says(h, "'Q' runs through the ground that the restrained "
                                      "pipe leans on") == (pass == 0));
        assert_false(kent_hand_says(h, "'P' runs"));
        finish(&b, r);
    }
}

/* Of a block with restrained joints the ground of both legs counts, beside the block's:
 * a main along either, 1.5 m to the side that is pushed, clear of the wedge. */
static void beside_a_block_with_joints_the_ground_of_both_legs_counts(void **state)
{
    (void)state;
    for (int pass = 0; pass < 2; pass++) {
        const double half = sqrt(0.5);
        kent_build b = kent_build_new();
        (void)kent_build_point(&b, "A", -300.0, 0.0, 50.0);
        (void)kent_build_point(&b, "B", 0.0, 0.0, 50.0);
        (void)kent_build_point(&b, "C", 200.0, 200.0, 50.0);
        const double near = 2.5, far = 12.0; /* m along the leg */
        (void)kent_build_point(&b, "S", pass ? (near + 1.5) * half : -near,
                               pass ? (near - 1.5) * half : -1.5, 50.0);
        (void)kent_build_point(&b, "T", pass ? (far + 1.5) * half : -far,
                               pass ? (far - 1.5) * half : -1.5, 50.0);
        const int p = kent_build_pipe(&b, "P", "A B C", 0.6, 1000.0);
        b.model->pipes[p].unit_mass = 150.0;
        (void)kent_build_pipe(&b, "Q", "S T", 0.6, 1000.0);
        (void)kent_build_fixed_level(&b, "A", 150.0);
        (void)kent_build_fixed_level(&b, "S", 150.0);
        (void)kent_build_outflow(&b, "C", 0.0);
        b.model->loads.test_pressure = 0.2e6;
        (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
        kent_soil *s = &b.model->soils[0];
        s->friction_angle = PI / 6.0;
        s->cohesion = 0.0;
        s->friction_ratio = 0.2;
        s->adhesion_ratio = 0.0;
        s->passive_ratio = 0.02;
        const int note = kent_build_note(&b, "B");
        b.model->notes[note].restraint = (int)KENT_BLOCK_AND_JOINTS;
        b.model->notes[note].stated.block_share = 0.1;
        kent_restraints *r = sized(&b);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
        assert_true(h->held && h->footprint.pipe_leans && h->footprint.leans);
        assert_true(h->legs[pass].length > near);
        kent_hand_expect(h, "'Q' runs through the ground that ");
        finish(&b, r);
    }
}

/* A street of dead ends, each of which meets the next alone: as many pairs, whatever
 * the number. */
static void many_fittings_meet_their_neighbours_alone(void **state)
{
    (void)state;
    enum { ENDS = 60 };
    kent_build b = kent_build_new();
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    b.model->ground.water_table = (double)INFINITY;
    b.model->loads.test_pressure = 0.2e6;
    for (int i = 0; i < ENDS; i++) {
        char from[16], to[16], pipe[16], route[40];
        (void)snprintf(from, sizeof from, "A%d", i);
        (void)snprintf(to, sizeof to, "E%d", i);
        (void)snprintf(pipe, sizeof pipe, "P%d", i);
        (void)snprintf(route, sizeof route, "%s %s", from, to);
        (void)kent_build_point(&b, from, -100.0, 4.0 * i, 50.0);
        (void)kent_build_point(&b, to, 0.0, 4.0 * i, 50.0);
        (void)kent_build_pipe(&b, pipe, route, 0.6, 1000.0);
        (void)kent_build_fixed_level(&b, from, 150.0);
        const int note = kent_build_note(&b, to);
        b.model->notes[note].restraint = (int)KENT_THRUST_BLOCK;
    }
    kent_restraints *r = sized(&b);
    size_t pairs = 0;
    for (int i = 0; i < ENDS; i++) {
        char id[16];
        size_t count = 0;
        (void)snprintf(id, sizeof id, "E%d", i);
        const kent_neighbour *n = near_to(&b, r, id, &count);
        assert_int_equal(count, i == 0 || i == ENDS - 1 ? 1 : 2);
        assert_int_equal(n->how, KENT_MEETS_SHARED);
        pairs += count;
    }
    assert_int_equal(pairs, r->space.count);
    finish(&b, r);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(figures_share_and_lie_apart_as_by_hand),
        cmocka_unit_test(blocks_face_to_face_collide_share_ground_or_do_not_meet),
        cmocka_unit_test(a_block_that_holds_both_ways_is_there_behind_too),
        cmocka_unit_test(wedges_meet_to_the_side_too),
        cmocka_unit_test(another_main_through_the_ground_is_named),
        cmocka_unit_test(a_main_beside_a_restrained_bend_is_named),
        cmocka_unit_test(beside_a_block_with_joints_the_ground_of_both_legs_counts),
        cmocka_unit_test(many_fittings_meet_their_neighbours_alone),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
