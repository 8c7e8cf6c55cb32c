/* What a case states for the restraint of a fitting, and pieces in line: what becomes
 * of it on the fittings of small mains, by hand. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <string.h>

/* R - T - E along +x with a branch T - B to the left, bore 0.3 m. */
static kent_build tee_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "T", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    kent_build_point(&b, "B", 100.0, 50.0, 0.0);
    kent_build_pipe(&b, "A", "R T E", 0.3, 1000.0);
    kent_build_pipe(&b, "C", "T B", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

static kent_fitting_note *note_on(kent_build *b, const char *at)
{
    const int i = kent_build_note(b, at);
    return &b->model->notes[i];
}

static const kent_fitting *fitting(const kent_build *b, const char *id)
{
    return &b->model->fittings[kent_build_fitting_of(b, id)];
}

static int toward(const kent_build *b, const kent_fitting *f, size_t port)
{
    return b->model->ports[f->port_first + port].toward;
}

/* ---- run and legs ---------------------------------------------------------------- */

static void lengths_of_a_run_go_to_its_ports(void **state)
{
    (void)state;
    kent_build b = tee_main();
    kent_fitting_note *n = note_on(&b, "T");
    n->run[0] = (kent_stated_run){2, 12.0}; /* E */
    n->run[1] = (kent_stated_run){0, 7.0};  /* R */
    kent_build_derive(&b);
    const kent_fitting *f = fitting(&b, "T");
    assert_int_equal(toward(&b, f, 0), 0);
    assert_close(f->stated.run_length[0], 7.0, 1e-15);
    assert_close(f->stated.run_length[1], 12.0, 1e-15);
    n = &b.model->notes[0];
    n->run[1].toward = -1;
    kent_build_derive(&b);
    assert_true(isnan(fitting(&b, "T")->stated.run_length[0]));
    assert_true(kent_model_is_valid(b.model));
    n->run[1].toward = 3; /* B, along the branch */
    kent_build_refused(&b,
                       "run_restrained names \"B\", which is no next point along its "
                       "run; there are \"R\", \"E\"",
                       800);
}

static void what_is_no_tee_has_no_run(void **state)
{
    (void)state;
    kent_build b = tee_main();
    note_on(&b, "E")->run[0] = (kent_stated_run){1, 12.0};
    kent_build_refused(&b, "run_restrained is of the run of a tee, and a dead-end",
                       800);
}

static void legs_that_can_be_shut_are_named_by_what_lies_next(void **state)
{
    (void)state;
    kent_build b = tee_main();
    int points[2] = {3, 2};
    kent_fitting_note *n = note_on(&b, "T");
    n->stated.closes_stated = true;
    n->stated.closes_count = 2;
    b.model->closes = points;
    b.model->closes_count = 2;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "T")->stated.closes_count, 2);
    assert_true(fitting(&b, "T")->stated.closes_stated);
    assert_true(kent_model_is_valid(b.model));
    points[1] = 1; /* itself */
    b.model->notes[0].place.line = 800;
    const char *said = kent_build_complaint(&b);
    assert_non_null(strstr(said,
                           "can_close names \"T\", which is no next point along a "
                           "leg of it; there are \"R\", \"E\", \"B\""));
    b.model->closes = NULL;
    b.model->closes_count = 0;
    kent_build_clear(&b);
}

static void an_end_has_no_legs_to_shut(void **state)
{
    (void)state;
    kent_build b = tee_main();
    note_on(&b, "E")->stated.closes_stated = true;
    kent_build_refused(&b, "can_close is of the legs of a tee, wye or cross", 800);
}

/* ---- in line --------------------------------------------------------------------- */

/* R - W - E along +x, 100 m each, on joints of a kind. */
static kent_build wall_main(kent_joint joint)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "W", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    const int p = kent_build_pipe(&b, "A", "R W E", 0.3, 1000.0);
    b.model->pipes[p].joint = joint;
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

static void a_piece_in_line_is_listed_where_the_main_goes_straight_on(void **state)
{
    (void)state;
    static const kent_role ROLES[] = {KENT_ROLE_WALL, KENT_ROLE_FLANGE_ADAPTOR};
    for (size_t i = 0; i < 2; i++) {
        kent_build b = wall_main(KENT_PUSH_ON);
        note_on(&b, "W")->role = ROLES[i];
        kent_build_derive(&b);
        const kent_fitting *f = fitting(&b, "W");
        assert_int_equal(f->type, KENT_STRAIGHT);
        assert_int_equal(f->role, ROLES[i]);
        assert_int_equal(f->restraint, KENT_NO_RESTRAINT);
        kent_build_clear(&b);
    }
}

/* A main that ends in a structure is held by it; one that ends in a flange adaptor
 * slips, whatever its own joints are. */
static void an_end_in_a_wall_is_held_by_it_one_in_an_adaptor_slips(void **state)
{
    (void)state;
    static const struct {
        kent_role role;
        kent_joint joint;
        kent_restraint_choice restraint;
    } ROWS[] = {
        {KENT_ROLE_NONE, KENT_PUSH_ON, KENT_THRUST_BLOCK},
        {KENT_ROLE_NONE, KENT_WELDED, KENT_RESTRAINED_JOINTS},
        {KENT_ROLE_WALL, KENT_PUSH_ON, KENT_NO_RESTRAINT},
        {KENT_ROLE_WALL, KENT_WELDED, KENT_NO_RESTRAINT},
        {KENT_ROLE_FLANGE_ADAPTOR, KENT_WELDED, KENT_THRUST_BLOCK},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        kent_build b = wall_main(ROWS[i].joint);
        note_on(&b, "E")->role = ROWS[i].role;
        kent_build_derive(&b);
        const kent_fitting *f = fitting(&b, "E");
        assert_int_equal(f->type, KENT_DEAD_END);
        assert_int_equal(f->restraint, ROWS[i].restraint);
        kent_build_clear(&b);
    }
}

static void an_end_named_in_line_is_one_though_water_is_drawn_there(void **state)
{
    (void)state;
    kent_build b = wall_main(KENT_PUSH_ON);
    kent_build_outflow(&b, "E", 0.02);
    note_on(&b, "E")->role = KENT_ROLE_WALL;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "E")->type, KENT_DEAD_END);
    kent_build_clear(&b);
}

static void a_piece_in_line_does_not_stand_where_the_water_ends(void **state)
{
    (void)state;
    kent_build b = wall_main(KENT_PUSH_ON);
    note_on(&b, "R")->role = KENT_ROLE_WALL;
    kent_build_refused(&b,
                       "a fixed level stands there; give the wall-piece a point of its "
                       "own on the pipe",
                       800);
    kent_build p = kent_build_new();
    kent_build_point(&p, "P", 0.0, 0.0, 0.0);
    kent_build_point(&p, "R", 100.0, 0.0, 20.0);
    kent_build_pipe(&p, "A", "P R", 0.3, 1000.0);
    kent_build_fixed_level(&p, "R", 30.0);
    const int pump = kent_build_pump(&p, "PU", "P", NULL, 40.0, 0.05, 30.0);
    p.model->pumps[pump].suction_level = 1.0;
    note_on(&p, "P")->role = KENT_ROLE_FLANGE_ADAPTOR;
    kent_build_refused(&p, "a pump stands there; give the flange-adaptor a point", 800);
}

static void a_manhole_tee_opens_upwards_unless_said(void **state)
{
    (void)state;
    kent_build b = wall_main(KENT_PUSH_ON);
    kent_fitting_note *n = note_on(&b, "W");
    n->role = KENT_ROLE_MANHOLE;
    n->branch = (kent_branch){.end = KENT_BRANCH_BLANK,
                              .direction = {(double)NAN, (double)NAN, (double)NAN},
                              .outside_diameter = 0.6,
                              .inside_diameter = (double)NAN,
                              .joint = KENT_FLANGED};
    kent_build_derive(&b);
    const kent_fitting *f = fitting(&b, "W");
    assert_int_equal(f->type, KENT_TEE);
    assert_int_equal(f->role, KENT_ROLE_MANHOLE);
    assert_close(f->branch.direction.z, 1.0, 1e-15);
    b.model->notes[0].branch.end = KENT_BRANCH_NONE;
    kent_build_refused(&b, "a manhole-tee needs its branch", 800);
}

/* ---- held as one ----------------------------------------------------------------- */

/* R - P - Q - E: two right angles 0.5 m apart on welded joints. */
static kent_build offset_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "P", 100.0, 0.0, 0.0);
    kent_build_point(&b, "Q", 100.0, 0.5, 0.0);
    kent_build_point(&b, "E", 200.0, 0.5, 0.0);
    const int p = kent_build_pipe(&b, "A", "R P Q E", 0.3, 1000.0);
    b.model->pipes[p].joint = KENT_WELDED;
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

static void a_group_lies_on_the_steeper_slope_and_the_weaker_backing(void **state)
{
    (void)state;
    kent_build b = offset_main();
    note_on(&b, "P")->stated.slope = (kent_slope){{1.0, 0.0, 0.0}, 0.1};
    kent_stated *q = &note_on(&b, "Q")->stated;
    q->slope = (kent_slope){{0.0, 1.0, 0.0}, 0.2};
    q->backing = KENT_BACKING_FILL;
    (void)snprintf(q->reason, sizeof q->reason, "old sewer");
    kent_build_derive(&b);
    const kent_fitting *f = fitting(&b, "P");
    assert_int_equal(f->type, KENT_GROUP);
    assert_close(f->stated.slope.angle, 0.2, 1e-15);
    assert_close(f->stated.slope.direction.y, 1.0, 1e-15);
    assert_int_equal(f->stated.backing, KENT_BACKING_FILL);
    assert_string_equal(f->stated.reason, "old sewer");
    assert_true(kent_model_is_valid(b.model));
    kent_build_clear(&b);
}

static void a_piece_in_line_is_never_part_of_a_group_unasked(void **state)
{
    (void)state;
    kent_build b = offset_main();
    note_on(&b, "Q")->role = KENT_ROLE_WALL;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "P")->type, KENT_BEND);
    assert_int_equal(fitting(&b, "Q")->type, KENT_BEND);
    assert_int_equal(fitting(&b, "Q")->restraint, KENT_NO_RESTRAINT);
    kent_build_clear(&b);
}

/* A tee beside a bend: what is said of its run does not go with the group. */
static void what_a_group_cannot_have_is_said(void **state)
{
    (void)state;
    kent_build b = tee_main();
    b.model->points[2].at = (kent_vec3){100.5, 0.0, 0.0}; /* E beside T */
    b.model->pipes[0].joint = b.model->pipes[1].joint = KENT_WELDED;
    note_on(&b, "T")->run[0] = (kent_stated_run){0, 7.0};
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "T")->type, KENT_GROUP);
    assert_true(isnan(fitting(&b, "T")->stated.run_length[0]));
    size_t said = 0;
    for (size_t i = 0; i < b.model->cautions.count; i++) {
        said += strstr(b.model->cautions.text[i],
                       "run_restrained and can_close of \"T\"") != NULL;
    }
    assert_int_equal(said, 1);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(lengths_of_a_run_go_to_its_ports),
        cmocka_unit_test(what_is_no_tee_has_no_run),
        cmocka_unit_test(legs_that_can_be_shut_are_named_by_what_lies_next),
        cmocka_unit_test(an_end_has_no_legs_to_shut),
        cmocka_unit_test(a_piece_in_line_is_listed_where_the_main_goes_straight_on),
        cmocka_unit_test(an_end_in_a_wall_is_held_by_it_one_in_an_adaptor_slips),
        cmocka_unit_test(an_end_named_in_line_is_one_though_water_is_drawn_there),
        cmocka_unit_test(a_piece_in_line_does_not_stand_where_the_water_ends),
        cmocka_unit_test(a_manhole_tee_opens_upwards_unless_said),
        cmocka_unit_test(a_group_lies_on_the_steeper_slope_and_the_weaker_backing),
        cmocka_unit_test(a_piece_in_line_is_never_part_of_a_group_unasked),
        cmocka_unit_test(what_a_group_cannot_have_is_said),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
