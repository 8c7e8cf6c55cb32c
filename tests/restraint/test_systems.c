/* Restrained lengths that meet: which are one system, how many joints it takes, and
 * what its outer legs must hold. By hand from docs/theory/22, whose rules are statics:
 * the pushes of a chain of bends add up to those of one bend of the whole turn. */
#include "kent_hand.h"

#include <string.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6}};

static void ask_for(kent_build *b, const char *at, kent_restraint_choice choice)
{
    const int note = kent_build_note(b, at);
    b->model->notes[note].restraint = (int)choice;
}

/* A, then B and C `apart` (m) with turns (rad), then E, 200 m on; restrained joints at
 * B and C; pipes of 6 m, 620 mm outside; till, cover 1.5 m. profile: the turns are in
 * the vertical, + up. */
static kent_build chain(double first, double second, double apart, bool profile)
{
    kent_build b = kent_build_new();
    const double both = first + second;
    const double c1 = cos(first), s1 = sin(first), c2 = cos(both), s2 = sin(both);
    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "B", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", apart * c1, profile ? 0.0 : apart * s1,
                           50.0 + (profile ? apart * s1 : 0.0));
    (void)kent_build_point(&b, "E", apart * c1 + 200.0 * c2,
                           profile ? 0.0 : apart * s1 + 200.0 * s2,
                           50.0 + (profile ? apart * s1 + 200.0 * s2 : 0.0));
    const int p = kent_build_pipe(&b, "P", "A B C E", 0.6, 1000.0);
    b.model->pipes[p].material_density = 7050.0;
    b.model->pipes[p].laying_length = 6.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "E", 0.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    kent_soil *s = &b.model->soils[0];
    s->friction_angle = 30.0 * DEGREE;
    s->cohesion = 0.0;
    s->friction_ratio = 0.75;
    s->passive_ratio = 0.6;
    b.model->ground.water_table = (double)INFINITY;
    b.model->loads.test_pressure = 1.0e6;
    ask_for(&b, "B", KENT_RESTRAINED_JOINTS);
    ask_for(&b, "C", KENT_RESTRAINED_JOINTS);
    for (size_t i = 0; i < b.model->note_count; i++) {
        b.model->notes[i].apart = true;
    }
    return b;
}

static kent_restraints *sized(kent_build *b)
{
    kent_build_derive(b);
    return kent_hand_size(b, TEST, 1);
}

static const kent_holding *at(const kent_build *b, const kent_restraints *r,
                              const char *id)
{
    return &r->fittings[kent_build_fitting_of(b, id)];
}

static void finish(kent_build *b, kent_restraints *r)
{
    kent_restraints_free(r);
    kent_build_clear(b);
}

static size_t says_in_all(const kent_restraints *r, const char *words)
{
    size_t count = 0;
    for (size_t i = 0; i < r->fitting_count; i++) {
        count += kent_hand_says(&r->fittings[i], words) ? 1 : 0;
    }
    return count;
}

/* N/m: friction, and what the side of the trench bears. */
static double rubs(void)
{
    const double iron = PI * 0.61 * 0.01 * 7050.0 * 9.80665;
    const double water = 1000.0 * 9.80665 * 0.25 * PI * 0.36;
    return (2.0 * 19e3 * 1.5 * 0.62 + iron + water) * tan(22.5 * DEGREE);
}

static double holds(void) { return rubs() + 0.5 * 0.6 * 3.0 * 19e3 * 1.81 * 0.62; }

static double factored(void) { return 1.5 * 1.0e6 * 0.25 * PI * 0.62 * 0.62; }

static void lengths_far_apart_are_systems_of_their_own(void **state)
{
    (void)state;
    kent_build b = chain(22.5 * DEGREE, 22.5 * DEGREE, 80.0, false);
    kent_restraints *r = sized(&b);
    assert_int_equal(r->systems.count, 2);
    for (size_t i = 0; i < 2; i++) {
        const kent_system_of *s = &r->systems.at[i];
        assert_int_equal(s->fitting_count, 1);
        assert_int_equal(s->outer_count, 2);
        assert_int_equal(s->joints, 2); /* a pipe each way */
        assert_close(s->length, 12.0, 1e-9);
        assert_true(s->fits && !s->across && !s->offset && !s->lengthened);
        assert_close(s->needed, 2.0 * factored() * tan(11.25 * DEGREE), 1e-9);
        assert_close(s->given, 12.0 * holds(), 1e-9);
    }
    assert_int_equal(says_in_all(r, "one system"), 0);
    finish(&b, r);
}

/* Opposite turns: the ways out are parallel, and together the bends do not push. Their
 * joints: one pipe each way and the piece of 5 m between, which has two. */
static void an_offset_is_one_system_and_each_joint_counts_once(void **state)
{
    (void)state;
    kent_build b = chain(22.5 * DEGREE, -22.5 * DEGREE, 5.0, false);
    kent_restraints *r = sized(&b);
    assert_int_equal(r->systems.count, 1);
    const kent_system_of *s = &r->systems.at[0];
    const kent_stretch *k = &r->systems.stretches[s->stretch_first];
    assert_int_equal(s->fitting_count, 2);
    assert_int_equal(s->stretch_count, 1);
    assert_int_equal(s->joints, 4);
    assert_close(k->from, 194.0, 1e-9);
    assert_close(k->to, 211.0, 1e-9);
    assert_close(k->station_from, 194.0, 1e-9);
    assert_false(s->lengthened);
    assert_close(at(&b, r, "B")->legs[0].length,
                 factored() * tan(11.25 * DEGREE) / holds(), 1e-9);
    assert_int_equal(says_in_all(r, "B and C meet and are one system: restrain every "
                                    "joint, 17.00 m, 4 joints (P from 0+194"),
                     1);
    finish(&b, r);
}

/* The same turn twice is one bend of 45 degrees, less what the 1.5 m on
 * either side of the piece between hold along the way out. */
static void two_turns_the_same_way_hold_as_one(void **state)
{
    (void)state;
    kent_build b = chain(22.5 * DEGREE, 22.5 * DEGREE, 6.0, false);
    b.model->pipes[0].laying_length = (double)NAN;
    kent_restraints *r = sized(&b);
    assert_int_equal(r->systems.count, 2); /* 2.5 m from either do not meet */
    finish(&b, r);

    b = chain(22.5 * DEGREE, 22.5 * DEGREE, 3.0, false);
    b.model->pipes[0].laying_length = (double)NAN;
    r = sized(&b);
    assert_int_equal(r->systems.count, 1);
    const double inner = 1.5 * holds() * cos(22.5 * DEGREE);
    const double length = (factored() * tan(22.5 * DEGREE) - inner) / holds();
    const double alone = factored() * tan(11.25 * DEGREE) / holds();
    assert_true(length > alone);
    const kent_holding *h = at(&b, r, "B"), *c = at(&b, r, "C");
    assert_close(h->legs[0].length, length, 1e-9);
    assert_close(h->legs[1].length, alone, 1e-9);
    assert_close(c->legs[1].length, length, 1e-9);
    assert_true(h->legs[0].lengthened && !h->legs[1].lengthened);
    assert_close(h->restrained_length, length, 1e-9);
    assert_true(r->systems.at[0].lengthened);
    assert_int_equal(r->systems.at[0].joints, 0); /* no pipe length is known */
    assert_close(r->systems.at[0].length, 3.0 + 2.0 * length, 1e-9);
    kent_hand_expect(h, "as part of a system its leg towards A runs over");
    assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 5);
    assert_non_null(kent_derivation_find(&h->derivation, "Ds"));
    finish(&b, r);
}

/* Together they turn by 135 degrees: the ways out are drawn along themselves. */
static void beyond_a_right_angle_the_whole_pull_is_held(void **state)
{
    (void)state;
    kent_build b = chain(67.5 * DEGREE, 67.5 * DEGREE, 3.0, false);
    b.model->pipes[0].laying_length = (double)NAN;
    kent_restraints *r = sized(&b);
    const double inner = 1.5 * holds() * cos(67.5 * DEGREE);
    assert_close(at(&b, r, "B")->legs[0].length, (factored() - inner) / rubs(), 1e-9);
    finish(&b, r);
}

static void a_crest_beside_a_sag_is_a_vertical_offset(void **state)
{
    (void)state;
    for (int profile = 0; profile < 2; profile++) {
        kent_build b = chain(-22.5 * DEGREE, 22.5 * DEGREE, 4.0, profile != 0);
        kent_restraints *r = sized(&b);
        assert_int_equal(r->systems.count, 1);
        assert_true(r->systems.at[0].offset == (profile == 1));
        assert_true((says_in_all(r, "one system, a vertical offset:") == 1) ==
                    (profile == 1));
        finish(&b, r);
    }
}

static void a_length_past_a_right_angle_is_flagged(void **state)
{
    (void)state;
    for (int right = 0; right < 2; right++) {
        kent_build b = chain(22.5 * DEGREE, (right ? 80.0 : 60.0) * DEGREE, 1.0, false);
        kent_restraints *r = sized(&b);
        assert_int_equal(r->systems.count, 1);
        assert_true(r->systems.at[0].across == (right == 1));
        assert_true(kent_hand_says(at(&b, r, "B"), "runs on past C, which turns 80") ==
                    (right == 1));
        finish(&b, r);
    }
}

/* E's push goes round the bend at C, 1.5 m before it, and on to B's side: of it the 1.5
 * m hold their friction times cos 22.5 degrees. */
static void a_dead_end_behind_a_bend_draws_the_leg_beyond(void **state)
{
    (void)state;
    for (int held = 0; held < 2; held++) {
        kent_build b = chain(22.5 * DEGREE, 22.5 * DEGREE, 100.0, false);
        const kent_vec3 corner = b.model->points[2].at;
        const kent_vec3 on = kent_vec3_sub(b.model->points[3].at, corner);
        b.model->outflow_count = 0;
        b.model->pipes[0].laying_length = (double)NAN;
        b.model->points[3].at = kent_vec3_add(corner, kent_vec3_scale(1.5 / 200.0, on));
        ask_for(&b, "E", held ? KENT_RESTRAINED_JOINTS : KENT_THRUST_BLOCK);
        b.model->notes[2].apart = true;
        kent_restraints *r = sized(&b);
        const kent_holding *c = at(&b, r, "C");
        assert_int_equal(r->systems.count, 2); /* B's is one by itself */
        if (held) {
            const double left = factored() - 1.5 * rubs() * cos(22.5 * DEGREE);
            assert_close(c->legs[0].length, left / rubs(), 1e-9);
            assert_int_equal(c->legs[1].end, KENT_LEG_AT_DEAD_END);
            assert_true(c->held && at(&b, r, "E")->held);
            assert_true(kent_hand_lines(&c->derivation, KENT_SI) > 5);
        } else {
            assert_false(c->held);
            kent_hand_expect(c, "reaches E");
        }
        finish(&b, r);
    }
}

/* 2.7 m from A the longer leg of the system does not fit, and neither bend's own length
 * is to be had then. */
static void a_system_that_does_not_fit_is_not_held(void **state)
{
    (void)state;
    kent_build b = chain(22.5 * DEGREE, 22.5 * DEGREE, 3.0, false);
    b.model->pipes[0].laying_length = (double)NAN;
    b.model->points[0].at.x = -2.7;
    kent_restraints *r = sized(&b);
    const double alone = factored() * tan(11.25 * DEGREE) / holds();
    assert_true(alone < 2.7);
    assert_false(at(&b, r, "B")->held);
    assert_true(at(&b, r, "C")->held);
    assert_false(r->systems.at[0].fits);
    assert_int_equal(r->not_held, 1);
    kent_hand_expect(at(&b, r, "B"), "longer than by itself, and does not fit");
    kent_hand_expect(at(&b, r, "B"), "not every leg of that system fits");
    finish(&b, r);
}

/* A tee 3 m from a bend, its run restrained over 4 m: what they push with together has
 * no form here. */
static void pushes_that_are_not_added_up_are_said(void **state)
{
    (void)state;
    for (int tee = 0; tee < 2; tee++) {
        kent_build b = chain(tee ? 0.0 : 22.5 * DEGREE, 22.5 * DEGREE, 3.0, false);
        if (tee) {
            (void)kent_build_point(&b, "S", 0.0, -100.0, 50.0);
            const int q = kent_build_pipe(&b, "Q", "B S", 0.2, 1000.0);
            b.model->pipes[q].material_density = 7050.0;
            b.model->notes[0].stated.run_length[0] = 4.0;
            b.model->notes[0].stated.run_length[1] = 4.0;
        }
        kent_restraints *r = sized(&b);
        assert_int_equal(r->systems.count, 1);
        assert_int_equal(r->systems.at[0].fitting_count, 2);
        assert_int_equal(says_in_all(r, "of that system are not added up"), tee);
        finish(&b, r);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(lengths_far_apart_are_systems_of_their_own),
        cmocka_unit_test(an_offset_is_one_system_and_each_joint_counts_once),
        cmocka_unit_test(two_turns_the_same_way_hold_as_one),
        cmocka_unit_test(beyond_a_right_angle_the_whole_pull_is_held),
        cmocka_unit_test(a_crest_beside_a_sag_is_a_vertical_offset),
        cmocka_unit_test(a_length_past_a_right_angle_is_flagged),
        cmocka_unit_test(a_dead_end_behind_a_bend_draws_the_leg_beyond),
        cmocka_unit_test(a_system_that_does_not_fit_is_not_held),
        cmocka_unit_test(pushes_that_are_not_added_up_are_said),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
