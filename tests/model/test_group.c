/* Fittings held as one. Limits by the rule of theory 05, figures by hand. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* A main of 0.6 m bore, 0.62 m outside (five diameters: 3.10 m), that turns left at P,
 * runs `gap` m and turns right at Q. */
static kent_build offset_in_plan(double gap, kent_joint joint)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", -100.0, 0.0, 10.0);
    kent_build_point(&b, "P", 0.0, 0.0, 10.0);
    kent_build_point(&b, "Q", gap * sqrt(0.5), gap * sqrt(0.5), 10.0);
    kent_build_point(&b, "E", 100.0, gap * sqrt(0.5), 10.0);
    kent_build_pipe(&b, "A", "R P Q E", 0.6, 1000.0);
    b.model->pipes[0].joint = joint;
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_fixed_level(&b, "E", 40.0);
    return b;
}

static const kent_fitting *fitting(const kent_build *b, const char *id)
{
    return &b->model->fittings[kent_build_fitting_of(b, id)];
}

static const kent_port *port(const kent_build *b, const char *id, size_t i)
{
    return &b->model->ports[fitting(b, id)->port_first + i];
}

static const char *member(const kent_build *b, const char *id, size_t i)
{
    const kent_model *m = b->model;
    assert_true(i < fitting(b, id)->member_count);
    return m->points[m->members[fitting(b, id)->member_first + i]].id;
}

/* The way equal pressures push, by the sum over all ports. */
static kent_vec3 push(const kent_build *b, const char *id)
{
    kent_vec3 sum = {0.0, 0.0, 0.0};
    for (size_t i = 0; i < fitting(b, id)->port_count; i++) {
        sum = kent_vec3_sub(sum, port(b, id, i)->direction);
    }
    return sum;
}

static void name_together(kent_build *b, const char *at, const char *with)
{
    const int note = kent_build_note(b, at);
    kent_model *m = b->model;
    free(m->together);
    m->together = kent_alloc(1, sizeof *m->together);
    assert_non_null(m->together);
    m->together[0] = kent_model_point_index(m, with);
    m->together_count = m->notes[note].together_count = 1;
}

/* Two stars of six legs each, 20 m apart, held as one: ten legs lead away. */
static void a_group_of_more_legs_than_can_be_worked_out_is_refused(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "P", 0.0, 0.0, 10.0);
    kent_build_point(&b, "Q", 20.0, 0.0, 10.0);
    kent_build_pipe(&b, "PQ", "P Q", 0.3, 1000.0);
    for (int i = 0; i < 10; i++) {
        const char id[] = {(char)('a' + i), '\0'};
        const char route[] = {i < 5 ? 'P' : 'Q', ' ', (char)('a' + i), '\0'};
        const double side = i < 5 ? -1.0 : 1.0;
        kent_build_point(&b, id, 10.0 + side * 60.0, 40.0 * (i % 5 - 2), 10.0);
        kent_build_pipe(&b, id, route, 0.3, 1000.0);
    }
    kent_build_fixed_level(&b, "a", 50.0);
    name_together(&b, "P", "Q");
    kent_build_refused(&b, "10 legs lead out of the 2 fittings held as one", 800);
}

static void bends_close_together_on_joints_that_hold_are_one(void **state)
{
    (void)state;
    kent_build b = offset_in_plan(3.09, KENT_RESTRAINED);
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 1);
    const kent_fitting *f = fitting(&b, "P");
    assert_int_equal(f->type, KENT_GROUP);
    assert_int_equal(f->member_count, 2);
    assert_string_equal(member(&b, "P", 0), "P");
    assert_string_equal(member(&b, "P", 1), "Q");
    assert_int_equal(f->port_count, 2); /* the legs between are gone */
    assert_int_equal(port(&b, "P", 0)->toward, kent_model_point_index(b.model, "R"));
    assert_int_equal(port(&b, "P", 1)->toward, kent_model_point_index(b.model, "E"));
    assert_close(port(&b, "P", 0)->chainage, 100.0, 1e-14);
    assert_close(port(&b, "P", 1)->chainage, 103.09, 1e-14);
    assert_close(port(&b, "P", 1)->level, 10.0, 1e-15);
    assert_within(kent_vec3_length(push(&b, "P")), 0.0, 1e-14); /* a couple is left */
    assert_close(f->at.x, 0.5 * 3.09 * sqrt(0.5), 1e-13);
    assert_int_equal(f->restraint, KENT_RESTRAINED_JOINTS);
    assert_int_equal(b.model->cautions.count, 0);
    assert_int_equal(kent_model_fitting_of(b.model, "Q"), 0);
    assert_int_equal(kent_model_fitting_of(b.model, "P"), 0);
    assert_int_equal(kent_model_fitting_of(b.model, "E"), -1);
    kent_build_clear(&b);

    kent_build wide = offset_in_plan(3.11, KENT_RESTRAINED);
    kent_build_derive(&wide);
    assert_int_equal(wide.model->fitting_count, 2);
    assert_int_equal(wide.model->cautions.count, 0);
    kent_build_clear(&wide);
}

static void apart_keeps_them_apart(void **state)
{
    (void)state;
    kent_build b = offset_in_plan(2.0, KENT_RESTRAINED);
    const int note = kent_build_note(&b, "Q");
    b.model->notes[note].apart = true;
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 2);
    assert_int_equal(b.model->cautions.count, 0);
    kent_build_clear(&b);
}

static void joints_that_slip_between_are_said_not_joined(void **state)
{
    (void)state;
    kent_build b = offset_in_plan(2.0, KENT_PUSH_ON);
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 2);
    assert_int_equal(b.model->cautions.count, 1);
    const char *said = b.model->cautions.text[0];
    assert_non_null(strstr(said, "\"P\" and \"Q\" stand 2.00 m apart"));
    assert_non_null(strstr(said, "together_with"));
    kent_build_clear(&b);
}

static void named_together_they_are_one_whatever_the_joints(void **state)
{
    (void)state;
    kent_build b = offset_in_plan(9.0, KENT_PUSH_ON);
    name_together(&b, "P", "Q");
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 1);
    assert_int_equal(fitting(&b, "P")->type, KENT_GROUP);
    assert_int_equal(fitting(&b, "P")->port_count, 2);
    assert_int_equal(fitting(&b, "P")->restraint, KENT_THRUST_BLOCK);
    assert_int_equal(b.model->cautions.count, 1);
    assert_non_null(
        strstr(b.model->cautions.text[0], "one block has to hold them all"));
    kent_build_clear(&b);
}

/* Down, across and up under a ditch: four bends of 45 degrees in profile. */
static void a_vertical_offset_is_one_and_pushes_nowhere(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", -100.0, 0.0, 10.0);
    kent_build_point(&b, "1", 0.0, 0.0, 10.0);
    kent_build_point(&b, "2", 1.5, 0.0, 8.5);
    kent_build_point(&b, "3", 4.0, 0.0, 8.5);
    kent_build_point(&b, "4", 5.5, 0.0, 10.0);
    kent_build_point(&b, "E", 100.0, 0.0, 10.0);
    kent_build_pipe(&b, "A", "R 1 2 3 4 E", 0.6, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_fixed_level(&b, "E", 40.0);
    kent_build_derive(&b); /* push-on: four bends, two of each kind */
    assert_int_equal(b.model->fitting_count, 4);
    assert_int_equal(fitting(&b, "1")->orientation, KENT_CREST);
    assert_int_equal(fitting(&b, "2")->orientation, KENT_SAG);
    assert_int_equal(fitting(&b, "3")->orientation, KENT_SAG);
    assert_int_equal(fitting(&b, "4")->orientation, KENT_CREST);
    assert_true(push(&b, "1").z > 0.0);
    assert_true(push(&b, "2").z < 0.0);
    assert_int_equal(b.model->cautions.count, 3);

    b.model->pipes[0].joint = KENT_FLANGED;
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 1);
    assert_int_equal(fitting(&b, "1")->member_count, 4);
    assert_int_equal(fitting(&b, "1")->port_count, 2);
    assert_within(kent_vec3_length(push(&b, "1")), 0.0, 1e-14);
    assert_int_equal(fitting(&b, "1")->orientation, KENT_HORIZONTAL);
    assert_close(fitting(&b, "1")->at.z, 9.25, 1e-14);
    kent_build_clear(&b);
}

/* A tee whose branch is reduced at once and ends: the outer legs are the run and
 * nothing else, so that the cap pulls against the tee. */
static void a_group_may_end_within_itself(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", -100.0, 0.0, 0.0);
    kent_build_point(&b, "T", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", 100.0, 0.0, 0.0);
    kent_build_point(&b, "D", 0.0, 1.0, 0.0);
    kent_build_pipe(&b, "A", "R T E", 0.6, 1000.0);
    kent_build_pipe(&b, "C", "T D", 0.3, 1000.0);
    b.model->pipes[1].joint = KENT_WELDED;
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_fixed_level(&b, "E", 40.0);
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 1);
    assert_int_equal(fitting(&b, "T")->member_count, 2);
    assert_int_equal(fitting(&b, "T")->port_count, 2);
    assert_within(kent_vec3_length(push(&b, "T")), 0.0, 1e-14);
    kent_build_clear(&b);
}

static void a_group_takes_the_least_cover_of_its_members(void **state)
{
    (void)state;
    kent_build b = offset_in_plan(2.0, KENT_RESTRAINED);
    kent_build_soil(&b, "clay", 50e3, 19e3, 1.5);
    kent_build_soil(&b, "sand", 80e3, 18e3, 1.2);
    b.model->points[2].cover = 0.9;
    b.model->points[2].soil = 0;
    kent_build_derive(&b);
    assert_close(fitting(&b, "P")->cover, 0.9, 1e-15);
    assert_int_equal(fitting(&b, "P")->soil, 1);
    assert_int_equal(b.model->cautions.count, 1);
    assert_non_null(strstr(b.model->cautions.text[0], "different soils"));
    kent_build_clear(&b);
}

/* Whichever member comes first: a block does not lean on peat because its fellow lies
 * in sand. */
static void a_member_in_ground_that_holds_nothing_decides(void **state)
{
    (void)state;
    for (int peat = 1; peat <= 2; peat++) { /* points P and Q */
        kent_build b = offset_in_plan(2.0, KENT_RESTRAINED);
        kent_build_soil(&b, "peat", 0.0, 11e3, 1.5);
        kent_build_soil(&b, "sand", 80e3, 18e3, 1.2);
        b.model->points[peat].soil = 0;
        kent_build_derive(&b);
        assert_int_equal(fitting(&b, "P")->soil, 0);
        assert_non_null(strstr(b.model->cautions.text[0], "peat is used"));
        kent_build_clear(&b);
    }
}

static void put_open_branch(kent_build *b, const char *at)
{
    const int note = kent_build_note(b, at);
    b->model->notes[note].branch = (kent_branch){.end = KENT_BRANCH_OPEN,
                                                 .direction = {0.0, 0.0, 1.0},
                                                 .outside_diameter = 0.1,
                                                 .inside_diameter = 0.09,
                                                 .joint = KENT_FLANGED};
    kent_build_outflow(b, at, 0.01);
}

static void two_open_ends_in_one_are_refused(void **state)
{
    (void)state;
    kent_build one = offset_in_plan(2.0, KENT_RESTRAINED);
    put_open_branch(&one, "P");
    kent_build_derive(&one);
    assert_int_equal(fitting(&one, "P")->member_count, 2);
    kent_build_clear(&one);

    kent_build two = offset_in_plan(2.0, KENT_RESTRAINED);
    put_open_branch(&two, "P");
    put_open_branch(&two, "Q");
    kent_build_refused(&two, "two open branches among those held as one", 800);
}

static void what_cannot_be_held_together_is_refused(void **state)
{
    (void)state;
    kent_build nothing = offset_in_plan(2.0, KENT_PUSH_ON);
    name_together(&nothing, "P", "R");
    kent_build_refused(&nothing, "together_with \"R\": no fitting stands there", 800);

    kent_build valve = offset_in_plan(2.0, KENT_PUSH_ON);
    kent_build_point(&valve, "F", 200.0, 2.0 * sqrt(0.5), 10.0);
    kent_build_pipe(&valve, "B", "E F", 0.6, 1000.0);
    valve.model->fixed_level_count = 1; /* the valve in place of the tank */
    kent_build_valve(&valve, "V1", "E", 0.1, (double)NAN);
    name_together(&valve, "P", "E");
    kent_build_refused(&valve, "a valve is held by itself", 800);

    kent_build differ = offset_in_plan(2.0, KENT_RESTRAINED);
    const int p = kent_build_note(&differ, "P"), q = kent_build_note(&differ, "Q");
    differ.model->notes[p].restraint = KENT_THRUST_BLOCK;
    differ.model->notes[q].restraint = KENT_RESTRAINED_JOINTS;
    kent_build_refused(&differ, "asks for another restraint", 801);
}

/* Bends of 30 degrees in two pipes without x and y. */
static void without_coordinates_fittings_are_not_added_up(void **state)
{
    (void)state;
    const double none = (double)NAN;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", none, none, 0.0);
    kent_build_point(&b, "P", none, none, 0.0);
    kent_build_point(&b, "Q", none, none, 0.0);
    kent_build_point(&b, "E", none, none, 0.0);
    kent_build_pipe(&b, "A", "R P", 0.6, 1000.0);
    kent_build_pipe(&b, "B", "P Q", 0.6, 1000.0);
    kent_build_pipe(&b, "C", "Q E", 0.6, 1000.0);
    for (int i = 0; i < 3; i++) {
        b.model->pipes[i].length = 2.0;
        b.model->pipes[i].joint = KENT_FLANGED;
    }
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_fixed_level(&b, "E", 40.0);
    const int p = kent_build_note(&b, "P"), q = kent_build_note(&b, "Q");
    b.model->notes[p].angle = b.model->notes[q].angle = 0.5;
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 2);
    assert_int_equal(b.model->cautions.count, 1);
    assert_non_null(strstr(b.model->cautions.text[0], "without x and y"));
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_member_in_ground_that_holds_nothing_decides),
        cmocka_unit_test(a_group_of_more_legs_than_can_be_worked_out_is_refused),
        cmocka_unit_test(bends_close_together_on_joints_that_hold_are_one),
        cmocka_unit_test(apart_keeps_them_apart),
        cmocka_unit_test(joints_that_slip_between_are_said_not_joined),
        cmocka_unit_test(named_together_they_are_one_whatever_the_joints),
        cmocka_unit_test(a_vertical_offset_is_one_and_pushes_nowhere),
        cmocka_unit_test(a_group_may_end_within_itself),
        cmocka_unit_test(a_group_takes_the_least_cover_of_its_members),
        cmocka_unit_test(two_open_ends_in_one_are_refused),
        cmocka_unit_test(what_cannot_be_held_together_is_refused),
        cmocka_unit_test(without_coordinates_fittings_are_not_added_up),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
