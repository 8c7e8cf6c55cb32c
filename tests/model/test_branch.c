/* What branches off without a pipe, and what fittings serve: rows of a list of fittings
 * with their types and signs, by hand. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <string.h>

static const double DEGREE = 3.14159265358979323846 / 180.0;
static const kent_vec3 LEFT_OUT = {(double)NAN, (double)NAN, (double)NAN};

/* R - T - E, 100 m and 100 m along +x, bore 0.3 m, outside 0.32 m. */
static kent_build straight_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "T", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R T E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

/* The same without coordinates, in two pipes. */
static kent_build schematic_main(void)
{
    const double none = (double)NAN;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", none, none, 0.0);
    kent_build_point(&b, "T", none, none, 0.0);
    kent_build_point(&b, "E", none, none, 0.0);
    kent_build_pipe(&b, "A", "R T", 0.3, 1000.0);
    kent_build_pipe(&b, "B", "T E", 0.3, 1000.0);
    b.model->pipes[0].length = b.model->pipes[1].length = 100.0;
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

/* A branch of 0.11 m outside, 0.1 m inside on the fitting of a point. */
static kent_fitting_note *branched(kent_build *b, const char *at, kent_vec3 direction,
                                   kent_branch_end end, kent_joint joint)
{
    const int i = kent_build_note(b, at);
    kent_fitting_note *note = &b->model->notes[i];
    note->branch = (kent_branch){.end = end,
                                 .direction = direction,
                                 .outside_diameter = 0.11,
                                 .inside_diameter = 0.10,
                                 .joint = joint};
    return note;
}

static const kent_fitting *fitting(const kent_build *b, const char *id)
{
    return &b->model->fittings[kent_build_fitting_of(b, id)];
}

static const kent_port *port(const kent_build *b, const char *id, size_t i)
{
    return &b->model->ports[fitting(b, id)->port_first + i];
}

static void a_blank_that_is_bolted_on_is_no_port(void **state)
{
    (void)state;
    kent_build b = straight_main();
    branched(&b, "T", (kent_vec3){0.0, 2.0, 0.0}, KENT_BRANCH_BLANK, KENT_FLANGED);
    kent_build_derive(&b);
    const kent_fitting *f = fitting(&b, "T");
    assert_int_equal(f->type, KENT_TEE);
    assert_int_equal(f->port_count, 2);
    assert_close(f->angle, 90.0 * DEGREE, 1e-14);
    assert_close(f->branch_size, 0.10, 1e-15);
    assert_close(f->size, 0.3, 1e-15);
    assert_int_equal(f->branch.end, KENT_BRANCH_BLANK);
    assert_close(f->branch.direction.y, 1.0, 1e-15); /* made unit */
    assert_int_equal(f->restraint, KENT_THRUST_BLOCK);
    assert_int_equal(b.model->cautions.count, 0);
    kent_build_clear(&b);
}

static void a_cap_that_slips_is_a_body_of_its_own(void **state)
{
    (void)state;
    kent_build b = straight_main();
    branched(&b, "T", (kent_vec3){0.0, 1.0, 0.0}, KENT_BRANCH_BLANK, KENT_PUSH_ON);
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "T")->port_count, 3);
    const kent_port *stub = port(&b, "T", 2);
    assert_int_equal(stub->kind, KENT_PORT_STUB);
    assert_int_equal(stub->span, -1);
    assert_close(stub->seal_diameter, 0.11, 1e-15); /* up to the gasket */
    assert_close(stub->inside_diameter, 0.10, 1e-15);
    assert_close(stub->direction.y, 1.0, 1e-15);
    assert_int_equal(b.model->cautions.count, 1);
    assert_non_null(strstr(b.model->cautions.text[0], "block of its own"));

    b.model->notes[0].branch.joint = KENT_RESTRAINED; /* holds: bolted on, as it were */
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "T")->port_count, 2);
    kent_build_clear(&b);
}

static void an_open_branch_discharges_what_is_drawn(void **state)
{
    (void)state;
    kent_build b = straight_main();
    kent_fitting_note *note =
        branched(&b, "T", (kent_vec3){0.0, 0.0, 1.0}, KENT_BRANCH_OPEN, KENT_FLANGED);
    note->role = KENT_ROLE_HYDRANT;
    kent_build_outflow(&b, "T", 0.02);
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "T")->type, KENT_TEE);
    assert_int_equal(fitting(&b, "T")->role, KENT_ROLE_HYDRANT);
    const kent_port *outlet = port(&b, "T", 2);
    assert_int_equal(outlet->kind, KENT_PORT_OUTLET);
    assert_close(outlet->seal_diameter, 0.10, 1e-15); /* flanged: on the bore */
    assert_close(outlet->direction.z, 1.0, 1e-15);
    b.model->outflow_count = 0;
    kent_build_refused(&b, "add an outflow at \"T\"", 800);
}

static void a_hydrant_stands_at_an_end_or_on_a_branch(void **state)
{
    (void)state;
    kent_build end = straight_main();
    kent_build_outflow(&end, "E", 0.02);
    int note = kent_build_note(&end, "E");
    end.model->notes[note].role = KENT_ROLE_HYDRANT;
    kent_build_derive(&end);
    assert_int_equal(fitting(&end, "E")->type, KENT_DEAD_END);
    assert_int_equal(fitting(&end, "E")->role, KENT_ROLE_HYDRANT);
    assert_int_equal(fitting(&end, "E")->port_count, 1);
    end.model->notes[note].branch = (kent_branch){.end = KENT_BRANCH_OPEN,
                                                  .direction = {0.0, 0.0, 1.0},
                                                  .outside_diameter = 0.08,
                                                  .inside_diameter = (double)NAN,
                                                  .joint = KENT_FLANGED};
    kent_build_derive(&end);
    assert_int_equal(fitting(&end, "E")->type, KENT_DEAD_END);
    assert_int_equal(fitting(&end, "E")->port_count, 2);
    assert_int_equal(port(&end, "E", 1)->kind, KENT_PORT_OUTLET);
    assert_close(port(&end, "E", 1)->inside_diameter, 0.08, 1e-15);
    kent_build_clear(&end);

    kent_build run = straight_main();
    note = kent_build_note(&run, "T");
    run.model->notes[note].role = KENT_ROLE_HYDRANT;
    kent_build_refused(&run, "a hydrant needs its branch", 800);
}

static void roles_need_their_branch(void **state)
{
    (void)state;
    static const kent_role roles[] = {KENT_ROLE_TAPPING, KENT_ROLE_AIR_VALVE,
                                      KENT_ROLE_WASHOUT};
    for (size_t i = 0; i < sizeof roles / sizeof roles[0]; i++) {
        kent_build bare = straight_main();
        const int note = kent_build_note(&bare, "T");
        bare.model->notes[note].role = roles[i];
        kent_build_refused(&bare, "needs its branch", 800);

        kent_build small = straight_main();
        branched(&small, "T", (kent_vec3){0.0, 0.0, 1.0}, KENT_BRANCH_VALVE,
                 KENT_FLANGED)
            ->role = roles[i];
        kent_build_derive(&small);
        assert_int_equal(fitting(&small, "T")->type, KENT_TEE);
        assert_int_equal(fitting(&small, "T")->role, roles[i]);
        kent_build_clear(&small);

        kent_build piped = straight_main(); /* a pipe leads off: its third leg */
        kent_build_point(&piped, "D", 100.0, 50.0, 0.0);
        kent_build_pipe(&piped, "C", "T D", 0.1, 1000.0);
        const int said = kent_build_note(&piped, "T");
        piped.model->notes[said].role = roles[i];
        kent_build_derive(&piped);
        assert_int_equal(fitting(&piped, "T")->type, KENT_TEE);
        assert_int_equal(fitting(&piped, "T")->port_count, 3);
        kent_build_clear(&piped);
    }
}

static void without_coordinates_a_branch_leads_to_the_left_an_air_valve_up(void **state)
{
    (void)state;
    kent_build b = schematic_main();
    kent_fitting_note *note =
        branched(&b, "T", LEFT_OUT, KENT_BRANCH_VALVE, KENT_PUSH_ON);
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "T")->type, KENT_TEE);
    assert_close(port(&b, "T", 0)->direction.x, -1.0, 1e-15);
    assert_close(port(&b, "T", 1)->direction.x, 1.0, 1e-15);
    assert_close(port(&b, "T", 2)->direction.y, 1.0, 1e-15);
    note->angle = 45.0 * DEGREE;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "T")->type, KENT_WYE);
    assert_close(port(&b, "T", 1)->direction.x, 1.0, 1e-15);
    assert_close(port(&b, "T", 2)->direction.x, sqrt(0.5), 1e-14);
    note->angle = (double)NAN;
    note->role = KENT_ROLE_AIR_VALVE;
    kent_build_derive(&b);
    assert_close(port(&b, "T", 2)->direction.z, 1.0, 1e-15);
    note->role = KENT_ROLE_WASHOUT; /* at the invert, but sideways */
    kent_build_derive(&b);
    assert_close(port(&b, "T", 2)->direction.y, 1.0, 1e-15);
    kent_build_clear(&b);
}

static void with_coordinates_a_branch_states_its_direction(void **state)
{
    (void)state;
    kent_build silent = straight_main();
    branched(&silent, "T", LEFT_OUT, KENT_BRANCH_BLANK, KENT_FLANGED);
    kent_build_refused(&silent, "direction = [ 0.000, 1.000, 0.000 ]", 800);

    kent_build nowhere = straight_main();
    branched(&nowhere, "T", (kent_vec3){0.0, 0.0, 0.0}, KENT_BRANCH_BLANK,
             KENT_FLANGED);
    kent_build_refused(&nowhere, "its branch has no direction", 800);

    kent_build along = straight_main();
    branched(&along, "T", (kent_vec3){cos(14.9 * DEGREE), sin(14.9 * DEGREE), 0.0},
             KENT_BRANCH_BLANK, KENT_FLANGED);
    kent_build_refused(&along, "within 15° of the pipe towards \"E\"", 800);

    kent_build steep = straight_main();
    branched(&steep, "T", (kent_vec3){-cos(15.1 * DEGREE), sin(15.1 * DEGREE), 0.0},
             KENT_BRANCH_BLANK, KENT_FLANGED);
    kent_build_derive(&steep);
    assert_int_equal(fitting(&steep, "T")->type, KENT_WYE);
    assert_close(fitting(&steep, "T")->angle, 15.1 * DEGREE, 1e-12);
    kent_build_clear(&steep);
}

static void a_branch_on_a_tee_makes_a_cross(void **state)
{
    (void)state;
    kent_build b = straight_main();
    kent_build_point(&b, "D", 100.0, 50.0, 0.0);
    kent_build_pipe(&b, "C", "T D", 0.1, 1000.0);
    branched(&b, "T", (kent_vec3){0.0, -1.0, 0.0}, KENT_BRANCH_VALVE, KENT_MECHANICAL);
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "T")->type, KENT_CROSS);
    assert_int_equal(fitting(&b, "T")->port_count, 4);
    assert_int_equal(port(&b, "T", 2)->kind, KENT_PORT_SPAN);
    assert_int_equal(port(&b, "T", 3)->kind, KENT_PORT_STUB);
    kent_build_clear(&b);
}

static void a_branch_stands_by_no_other_device(void **state)
{
    (void)state;
    const kent_vec3 up = {0.0, 0.0, 1.0};
    kent_build valve = straight_main();
    kent_build_valve(&valve, "V1", "T", 0.1, (double)NAN);
    branched(&valve, "T", up, KENT_BRANCH_BLANK, KENT_FLANGED);
    kent_build_refused(&valve, "a valve stands there", 800);

    kent_build tank = straight_main();
    branched(&tank, "R", up, KENT_BRANCH_BLANK, KENT_FLANGED);
    kent_build_refused(&tank, "a fixed level stands there", 800);

    kent_build bend = straight_main();
    branched(&bend, "T", up, KENT_BRANCH_BLANK, KENT_FLANGED)->type = KENT_BEND;
    kent_build_refused(&bend, "cannot be a bend", 800);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_blank_that_is_bolted_on_is_no_port),
        cmocka_unit_test(a_cap_that_slips_is_a_body_of_its_own),
        cmocka_unit_test(an_open_branch_discharges_what_is_drawn),
        cmocka_unit_test(a_hydrant_stands_at_an_end_or_on_a_branch),
        cmocka_unit_test(roles_need_their_branch),
        cmocka_unit_test(
            without_coordinates_a_branch_leads_to_the_left_an_air_valve_up),
        cmocka_unit_test(with_coordinates_a_branch_states_its_direction),
        cmocka_unit_test(a_branch_on_a_tee_makes_a_cross),
        cmocka_unit_test(a_branch_stands_by_no_other_device),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
