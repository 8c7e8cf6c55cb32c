/* Fittings out of geometry in space. Angles by hand; no published source is needed. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>

static const double DEGREE = 3.14159265358979323846 / 180.0;

/* A main R - B - E that turns at B; coordinates of R and E relative to B, m. */
static kent_build turning(kent_vec3 from, kent_vec3 to)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", from.x, from.y, from.z);
    kent_build_point(&b, "B", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", to.x, to.y, to.z);
    kent_build_pipe(&b, "A", "R B E", 0.6, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

/* A new note on the point's fitting, to be filled in. */
static kent_fitting_note *noted(kent_build *b, const char *at)
{
    const int note = kent_build_note(b, at);
    return &b->model->notes[note];
}

static const kent_fitting *fitting(const kent_build *b, const char *id)
{
    return &b->model->fittings[kent_build_fitting_of(b, id)];
}

static const kent_port *port(const kent_build *b, const char *id, size_t i)
{
    return &b->model->ports[fitting(b, id)->port_first + i];
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

static bool has_fitting(const kent_build *b, const char *id)
{
    const int point = kent_model_point_index(b->model, id);
    for (size_t i = 0; i < b->model->fitting_count; i++) {
        if (b->model->fittings[i].point == point) return true;
    }
    return false;
}

static void a_turn_in_plan_is_a_horizontal_bend(void **state)
{
    (void)state;
    kent_build b = turning((kent_vec3){-100.0, 0.0, 0.0}, (kent_vec3){60.0, 60.0, 0.0});
    kent_build_derive(&b);
    const kent_fitting *f = fitting(&b, "B");
    assert_int_equal(f->type, KENT_BEND);
    assert_int_equal(f->orientation, KENT_HORIZONTAL);
    assert_close(f->angle, 45.0 * DEGREE, 1e-14);
    assert_close(f->plan_turn, 45.0 * DEGREE, 1e-14); /* to the left */
    assert_int_equal(f->restraint, KENT_THRUST_BLOCK);
    assert_true(push(&b, "B").y < 0.0); /* to the outside of the turn */
    kent_build_clear(&b);
}

static void a_turn_to_the_right_is_negative_in_plan(void **state)
{
    (void)state;
    kent_build b =
        turning((kent_vec3){-100.0, 0.0, 0.0}, (kent_vec3){60.0, -60.0, 0.0});
    kent_build_derive(&b);
    assert_close(fitting(&b, "B")->plan_turn, -45.0 * DEGREE, 1e-14);
    kent_build_clear(&b);
}

static void a_turn_on_an_even_slope_still_pushes_level(void **state)
{
    (void)state;
    kent_build b =
        turning((kent_vec3){-100.0, 0.0, 5.0}, (kent_vec3){0.0, 100.0, -5.0});
    kent_build_derive(&b);
    const kent_fitting *f = fitting(&b, "B");
    assert_int_equal(f->orientation, KENT_HORIZONTAL);
    /* directions (100, 0, -5) and (0, 100, -5): cos = 25 / 10025 */
    assert_close(f->angle, acos(25.0 / 10025.0), 1e-12);
    kent_build_clear(&b);
}

static void a_crest_pushes_up_and_a_sag_down(void **state)
{
    (void)state;
    kent_build crest =
        turning((kent_vec3){-100.0, 0.0, -10.0}, (kent_vec3){100.0, 0.0, -10.0});
    kent_build_derive(&crest);
    assert_int_equal(fitting(&crest, "B")->orientation, KENT_CREST);
    assert_close(fitting(&crest, "B")->angle, 2.0 * atan(0.1), 1e-13);
    assert_within(fitting(&crest, "B")->plan_turn, 0.0, 1e-14);
    assert_true(push(&crest, "B").z > 0.0);
    kent_build_clear(&crest);

    kent_build sag =
        turning((kent_vec3){-100.0, 0.0, 10.0}, (kent_vec3){100.0, 0.0, 10.0});
    kent_build_derive(&sag);
    assert_int_equal(fitting(&sag, "B")->orientation, KENT_SAG);
    assert_true(push(&sag, "B").z < 0.0);
    kent_build_clear(&sag);
}

static void a_combined_bend_has_its_angle_in_space(void **state)
{
    (void)state;
    /* comes in level along +x, leaves along (1, 1, -1): cos = 1/sqrt 3 */
    kent_build b =
        turning((kent_vec3){-100.0, 0.0, 0.0}, (kent_vec3){50.0, 50.0, -50.0});
    kent_build_derive(&b);
    const kent_fitting *f = fitting(&b, "B");
    assert_int_equal(f->orientation, KENT_COMBINED);
    assert_close(f->angle, acos(1.0 / sqrt(3.0)), 1e-13); /* 54.74, not 45 degrees */
    assert_close(f->plan_turn, 45.0 * DEGREE, 1e-13);
    kent_build_clear(&b);
}

static void a_drop_from_a_riser_is_no_turn_in_plan(void **state)
{
    (void)state;
    kent_build b = turning((kent_vec3){0.0, 0.0, 20.0}, (kent_vec3){100.0, 0.0, 0.0});
    kent_build_derive(&b);
    assert_close(fitting(&b, "B")->angle, 90.0 * DEGREE, 1e-13);
    assert_within(fitting(&b, "B")->plan_turn, 0.0, 0.0);
    assert_int_equal(fitting(&b, "B")->orientation, KENT_SAG);
    kent_build_clear(&b);
}

static void a_turn_that_the_joint_takes_is_listed_but_not_restrained(void **state)
{
    (void)state;
    kent_build b = turning((kent_vec3){-100.0, 0.0, 0.0}, (kent_vec3){100.0, 4.0, 0.0});
    b.model->pipes[0].joint_deflection = 3.0 * DEGREE;
    kent_build_derive(&b); /* turns by 2.29 degrees */
    assert_true(fitting(&b, "B")->within_deflection);
    assert_int_equal(fitting(&b, "B")->restraint, KENT_NO_RESTRAINT);

    b.model->pipes[0].joint_deflection = 2.0 * DEGREE;
    kent_build_derive(&b);
    assert_false(fitting(&b, "B")->within_deflection);
    assert_int_equal(fitting(&b, "B")->restraint, KENT_THRUST_BLOCK);

    b.model->pipes[0].joint_deflection = 3.0 * DEGREE; /* but named as a casting */
    noted(&b, "B")->type = KENT_BEND;
    kent_build_derive(&b);
    assert_false(fitting(&b, "B")->within_deflection);
    kent_build_clear(&b);
}

static void a_turn_below_half_a_degree_is_no_fitting(void **state)
{
    (void)state;
    kent_build b =
        turning((kent_vec3){-100.0, 0.0, 0.0}, (kent_vec3){100.0, 0.86, 0.0});
    kent_build_derive(&b); /* 0.493 degrees */
    assert_false(has_fitting(&b, "B"));
    b.model->points[2].at.y = 0.89; /* 0.510 degrees */
    kent_build_derive(&b);
    assert_true(has_fitting(&b, "B"));
    kent_build_clear(&b);
}

static void the_ports_of_a_bend_in_mid_span_watch_one_place(void **state)
{
    (void)state;
    kent_build b = turning((kent_vec3){-30.0, 0.0, 0.0}, (kent_vec3){0.0, 70.0, 0.0});
    kent_build_derive(&b);
    const kent_port *in = port(&b, "B", 0), *out = port(&b, "B", 1);
    assert_int_equal(in->span, out->span);
    assert_close(in->chainage, 30.0, 1e-14);
    assert_close(out->chainage, 30.0, 1e-14);
    assert_within(in->sign, -1.0, 0.0); /* flow along the span comes in there */
    assert_within(out->sign, 1.0, 0.0);
    assert_int_equal(in->toward, kent_model_point_index(b.model, "R"));
    assert_int_equal(out->toward, kent_model_point_index(b.model, "E"));
    assert_close(in->direction.x, -1.0, 1e-14);
    assert_close(out->direction.y, 1.0, 1e-14);
    kent_build_clear(&b);
}

static void
a_gasketed_joint_seals_on_the_outside_a_continuous_one_on_the_bore(void **state)
{
    (void)state;
    static const struct {
        double seal; /* m: bore 0.6, outside diameter 0.62 */
        kent_joint joint;
        kent_restraint_choice restraint;
    } rows[] = {
        {0.62, KENT_PUSH_ON, KENT_THRUST_BLOCK},
        {0.62, KENT_MECHANICAL, KENT_THRUST_BLOCK},
        {0.62, KENT_RESTRAINED, KENT_RESTRAINED_JOINTS},
        {0.60, KENT_FLANGED, KENT_RESTRAINED_JOINTS},
        {0.60, KENT_WELDED, KENT_RESTRAINED_JOINTS},
        {0.60, KENT_FUSED, KENT_RESTRAINED_JOINTS},
    };
    kent_build b = turning((kent_vec3){-30.0, 0.0, 0.0}, (kent_vec3){0.0, 70.0, 0.0});
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        b.model->pipes[0].joint = rows[i].joint;
        kent_build_derive(&b);
        assert_close(port(&b, "B", 0)->seal_diameter, rows[i].seal, 1e-14);
        assert_int_equal(fitting(&b, "B")->restraint, rows[i].restraint);
    }
    kent_build_clear(&b);
}

/* R - T - E along x, a branch T - D of 0.15 m at `degrees` from the downstream run. */
static kent_build branching(double degrees, double bore)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", -100.0, 0.0, 0.0);
    kent_build_point(&b, "T", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", 100.0, 0.0, 0.0);
    kent_build_point(&b, "D", 50.0 * cos(degrees * DEGREE),
                     50.0 * sin(degrees * DEGREE), 0.0);
    kent_build_pipe(&b, "C", "T D", bore, 1000.0); /* the branch listed first */
    kent_build_pipe(&b, "A", "R T E", 0.6, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

static void the_run_of_a_tee_is_its_straight_pair_upstream_first(void **state)
{
    (void)state;
    kent_build b = branching(90.0, 0.6); /* all of one size: direction decides */
    kent_build_derive(&b);
    const kent_fitting *f = fitting(&b, "T");
    assert_int_equal(f->type, KENT_TEE);
    assert_close(f->angle, 90.0 * DEGREE, 1e-13);
    assert_int_equal(port(&b, "T", 0)->toward, kent_model_point_index(b.model, "R"));
    assert_int_equal(port(&b, "T", 1)->toward, kent_model_point_index(b.model, "E"));
    assert_int_equal(port(&b, "T", 2)->toward, kent_model_point_index(b.model, "D"));
    assert_true(push(&b, "T").y < 0.0); /* away from the branch */
    kent_build_clear(&b);
}

static void a_tee_knows_the_size_of_run_and_branch(void **state)
{
    (void)state;
    kent_build b = branching(90.0, 0.15);
    kent_build_derive(&b);
    assert_close(fitting(&b, "T")->size, 0.6, 1e-15);
    assert_close(fitting(&b, "T")->branch_size, 0.15, 1e-15);
    assert_close(fitting(&b, "T")->outside_diameter, 0.62, 1e-15);
    assert_int_equal(fitting(&b, "T")->restraint, KENT_THRUST_BLOCK);
    kent_build_clear(&b);
}

static void a_branch_below_75_degrees_makes_a_wye(void **state)
{
    (void)state;
    kent_build wye = branching(74.0, 0.15);
    kent_build_derive(&wye);
    assert_int_equal(fitting(&wye, "T")->type, KENT_WYE);
    assert_close(fitting(&wye, "T")->angle, 74.0 * DEGREE, 1e-13);
    kent_build_clear(&wye);
    kent_build tee = branching(104.0, 0.15); /* 76 degrees from the upstream run */
    kent_build_derive(&tee);
    assert_int_equal(fitting(&tee, "T")->type, KENT_TEE);
    assert_close(fitting(&tee, "T")->angle, 76.0 * DEGREE, 1e-13);
    kent_build_clear(&tee);
}

static void four_legs_make_a_cross(void **state)
{
    (void)state;
    kent_build b = branching(90.0, 0.15);
    kent_build_point(&b, "F", 0.0, -40.0, 0.0);
    kent_build_pipe(&b, "F", "T F", 0.15, 1000.0);
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "T")->type, KENT_CROSS);
    assert_int_equal(fitting(&b, "T")->port_count, 4);
    assert_within(kent_vec3_length(push(&b, "T")), 0.0, 1e-14);
    kent_build_clear(&b);
}

static void two_outside_diameters_make_a_reducer(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "X", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R X", 0.6, 1000.0);
    kent_build_pipe(&b, "B", "X E", 0.4, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "X")->type, KENT_REDUCER);
    assert_int_equal(fitting(&b, "X")->restraint, KENT_ANCHOR_BLOCK);
    assert_close(port(&b, "X", 0)->inside_diameter, 0.6, 1e-15);
    assert_close(port(&b, "X", 1)->inside_diameter, 0.4, 1e-15);
    assert_int_equal(b.model->cautions.count, 0);

    b.model->points[2].at.y = 50.0; /* it turns as well: ports true, and said */
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "X")->type, KENT_REDUCER);
    assert_close(port(&b, "X", 1)->direction.y, 50.0 / hypot(100.0, 50.0), 1e-14);
    assert_int_equal(b.model->cautions.count, 1);

    b.model->pipes[1].outside_diameter = b.model->pipes[0].outside_diameter;
    kent_build_derive(&b); /* a change of class alone: the turn is what counts */
    assert_int_equal(fitting(&b, "X")->type, KENT_BEND);
    b.model->points[2].at.y = 0.0;
    kent_build_derive(&b);
    assert_false(has_fitting(&b, "X"));
    kent_build_clear(&b);
}

static void a_reducer_is_pushed_towards_its_small_end_either_way(void **state)
{
    (void)state;
    static const double bores[2][2] = {{0.6, 0.4}, {0.4, 0.6}}; /* m, along the flow */
    for (size_t i = 0; i < 2; i++) {
        kent_build b = kent_build_new();
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "X", 100.0, 0.0, 0.0);
        kent_build_point(&b, "E", 200.0, 0.0, 0.0);
        kent_build_pipe(&b, "A", "R X", bores[i][0], 1000.0);
        kent_build_pipe(&b, "B", "X E", bores[i][1], 1000.0);
        kent_build_fixed_level(&b, "R", 50.0);
        kent_build_derive(&b);
        const kent_port *in = port(&b, "X", 0), *out = port(&b, "X", 1);
        const double push = -in->seal_diameter * in->seal_diameter * in->direction.x -
                            out->seal_diameter * out->seal_diameter * out->direction.x;
        assert_int_equal(fitting(&b, "X")->type, KENT_REDUCER);
        assert_true(i == 0 ? push > 0.0 : push < 0.0);
        assert_close(fitting(&b, "X")->size, 0.6, 1e-15);
        kent_build_clear(&b);
    }
}

static void a_route_ending_in_nothing_is_a_dead_end(void **state)
{
    (void)state;
    kent_build b = turning((kent_vec3){-100.0, 0.0, 0.0}, (kent_vec3){50.0, 0.0, 0.0});
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 1);
    const kent_fitting *f = fitting(&b, "E");
    assert_int_equal(f->type, KENT_DEAD_END);
    assert_int_equal(f->port_count, 1);
    assert_close(port(&b, "E", 0)->direction.x, -1.0, 1e-14);
    assert_within(port(&b, "E", 0)->sign, -1.0, 0.0);
    assert_close(port(&b, "E", 0)->chainage, 150.0, 1e-14);
    assert_true(push(&b, "E").x > 0.0);

    kent_build_outflow(&b, "E", 0.01); /* something draws there: no fitting ... */
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 0);
    noted(&b, "E")->type = KENT_DEAD_END;
    kent_build_derive(&b); /* ... unless the case says so */
    assert_int_equal(fitting(&b, "E")->type, KENT_DEAD_END);
    kent_build_clear(&b);
}

static void valves_are_fittings_with_one_or_two_ports(void **state)
{
    (void)state;
    kent_build b = turning((kent_vec3){-100.0, 0.0, 0.0}, (kent_vec3){50.0, 0.0, 0.0});
    kent_build_valve(&b, "V1", "B", 0.1, (double)NAN);
    kent_build_valve(&b, "V2", "E", 0.1, 0.0);
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "B")->type, KENT_VALVE);
    assert_int_equal(fitting(&b, "B")->port_count, 2);
    assert_int_equal(fitting(&b, "B")->valve, 0);
    assert_int_equal(fitting(&b, "B")->restraint, KENT_ANCHOR_BLOCK);
    assert_true(port(&b, "B", 0)->direction.x < 0.0); /* the arriving side first */
    assert_int_equal(fitting(&b, "E")->type, KENT_VALVE);
    assert_int_equal(fitting(&b, "E")->port_count, 1);
    assert_int_equal(fitting(&b, "E")->valve, 1);
    kent_build_clear(&b);
}

static void fittings_stand_in_the_order_of_routes_and_ports_only_last(void **state)
{
    (void)state;
    kent_build b = branching(90.0, 0.15);
    const kent_port end = kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, 1e5, 0.0, 0.1);
    kent_build_ports(&b, "loose", -1, &end, 1);
    kent_build_derive(&b);
    const kent_fitting *f = b.model->fittings;
    assert_int_equal(b.model->fitting_count, 4);
    assert_string_equal(f[0].id, "T");
    assert_string_equal(f[1].id, "D");
    assert_string_equal(f[2].id, "E");
    assert_string_equal(f[3].id, "loose");
    kent_build_clear(&b);
}

static void ground_comes_from_note_then_point_then_ground(void **state)
{
    (void)state;
    kent_build b = turning((kent_vec3){-100.0, 0.0, 0.0}, (kent_vec3){60.0, 60.0, 0.0});
    const int sand = kent_build_soil(&b, "sand", 80e3, 18e3, 1.1);
    const int clay = kent_build_soil(&b, "clay", 50e3, 19e3, 1.2);
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "B")->soil, clay);
    assert_close(fitting(&b, "B")->cover, 1.2, 1e-15);
    assert_true(isinf(fitting(&b, "B")->water_table));
    b.model->points[1].soil = sand;
    b.model->points[1].cover = 1.5;
    b.model->points[1].water_table = 0.8;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "B")->soil, sand);
    assert_close(fitting(&b, "B")->cover, 1.5, 1e-15);
    assert_close(fitting(&b, "B")->water_table, 0.8, 1e-15);
    kent_fitting_note *note = noted(&b, "B");
    note->soil = clay;
    note->cover = 2.0;
    note->weight = 4000.0;
    note->face = 0.4;
    note->restraint = KENT_RESTRAINED_JOINTS;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "B")->soil, clay);
    assert_close(fitting(&b, "B")->cover, 2.0, 1e-15);
    assert_close(fitting(&b, "B")->weight, 4000.0, 1e-15);
    assert_close(port(&b, "B", 1)->face, 0.4, 1e-15);
    assert_int_equal(fitting(&b, "B")->restraint, KENT_RESTRAINED_JOINTS);
    kent_build_clear(&b);
}

static void add_pipe(kent_build *b, const char *id, const char *route, double length)
{
    const int pipe = kent_build_pipe(b, id, route, 0.3, 1000.0);
    b->model->pipes[pipe].length = length;
}

/* A schematic main: no x, no y; R - B in one pipe, B - E in another. */
static kent_build schematic(void)
{
    const double none = (double)NAN;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", none, none, 20.0);
    kent_build_point(&b, "B", none, none, 10.0);
    kent_build_point(&b, "E", none, none, 5.0);
    add_pipe(&b, "A", "R B", 200.0);
    add_pipe(&b, "C", "B E", 100.0);
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

static void without_coordinates_flow_arrives_along_x_and_bends_turn_left(void **state)
{
    (void)state;
    kent_build b = schematic();
    kent_build_derive(&b);
    assert_false(has_fitting(&b, "B"));
    noted(&b, "B")->angle = 30.0 * DEGREE;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "B")->type, KENT_BEND);
    assert_close(fitting(&b, "B")->angle, 30.0 * DEGREE, 1e-13);
    assert_int_equal(fitting(&b, "B")->orientation, KENT_HORIZONTAL);
    assert_close(port(&b, "B", 0)->direction.x, -1.0, 1e-15);
    assert_close(port(&b, "B", 1)->direction.y, 0.5, 1e-14);
    assert_true(push(&b, "B").y < 0.0);

    b.model->notes[0].orientation = KENT_CREST;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "B")->orientation, KENT_CREST);
    assert_close(port(&b, "B", 1)->direction.z, -0.5, 1e-14);
    assert_true(push(&b, "B").z > 0.0);

    b.model->notes[0].orientation = KENT_SAG;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "B")->orientation, KENT_SAG);
    assert_true(push(&b, "B").z < 0.0);
    kent_build_clear(&b);
}

static void without_coordinates_the_smaller_leg_of_three_is_the_branch(void **state)
{
    (void)state;
    kent_build b = schematic();
    const double none = (double)NAN;
    kent_build_point(&b, "D", none, none, 5.0);
    const int branch = kent_build_pipe(&b, "D", "B D", 0.1, 1000.0);
    b.model->pipes[branch].length = 50.0;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "B")->type, KENT_TEE);
    assert_close(port(&b, "B", 2)->inside_diameter, 0.1, 1e-15);
    assert_close(port(&b, "B", 2)->direction.y, 1.0, 1e-14);
    assert_close(port(&b, "B", 1)->direction.x, 1.0, 1e-15);
    b.model->pipes[0].inside_diameter = 0.05; /* now the arriving leg is smallest */
    kent_build_derive(&b);
    assert_close(port(&b, "B", 2)->inside_diameter, 0.05, 1e-15);
    kent_build_clear(&b);
}

static void a_turned_main_has_the_same_angles(void **state)
{
    (void)state;
    /* Rotating the whole survey about the vertical changes no fitting. */
    for (int step = 0; step < 24; step++) {
        const double c = cos(15.0 * step * DEGREE), s = sin(15.0 * step * DEGREE);
        kent_build b =
            turning((kent_vec3){-80.0 * c, -80.0 * s, 7.0},
                    (kent_vec3){60.0 * c - 25.0 * s, 60.0 * s + 25.0 * c, -9.0});
        kent_build_derive(&b);
        const double in = hypot(80.0, 7.0);
        const double out = sqrt(60.0 * 60.0 + 25.0 * 25.0 + 9.0 * 9.0);
        const double want = acos((80.0 * 60.0 + 7.0 * 9.0) / (in * out));
        assert_close(fitting(&b, "B")->angle, want, 1e-12);
        assert_close(fitting(&b, "B")->plan_turn, atan2(25.0, 60.0), 1e-12);
        kent_build_clear(&b);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_turn_in_plan_is_a_horizontal_bend),
        cmocka_unit_test(a_turn_to_the_right_is_negative_in_plan),
        cmocka_unit_test(a_turn_on_an_even_slope_still_pushes_level),
        cmocka_unit_test(a_crest_pushes_up_and_a_sag_down),
        cmocka_unit_test(a_combined_bend_has_its_angle_in_space),
        cmocka_unit_test(a_drop_from_a_riser_is_no_turn_in_plan),
        cmocka_unit_test(a_turn_that_the_joint_takes_is_listed_but_not_restrained),
        cmocka_unit_test(a_turn_below_half_a_degree_is_no_fitting),
        cmocka_unit_test(the_ports_of_a_bend_in_mid_span_watch_one_place),
        cmocka_unit_test(
            a_gasketed_joint_seals_on_the_outside_a_continuous_one_on_the_bore),
        cmocka_unit_test(the_run_of_a_tee_is_its_straight_pair_upstream_first),
        cmocka_unit_test(a_tee_knows_the_size_of_run_and_branch),
        cmocka_unit_test(a_branch_below_75_degrees_makes_a_wye),
        cmocka_unit_test(four_legs_make_a_cross),
        cmocka_unit_test(two_outside_diameters_make_a_reducer),
        cmocka_unit_test(a_reducer_is_pushed_towards_its_small_end_either_way),
        cmocka_unit_test(a_route_ending_in_nothing_is_a_dead_end),
        cmocka_unit_test(valves_are_fittings_with_one_or_two_ports),
        cmocka_unit_test(fittings_stand_in_the_order_of_routes_and_ports_only_last),
        cmocka_unit_test(ground_comes_from_note_then_point_then_ground),
        cmocka_unit_test(without_coordinates_flow_arrives_along_x_and_bends_turn_left),
        cmocka_unit_test(without_coordinates_the_smaller_leg_of_three_is_the_branch),
        cmocka_unit_test(a_turned_main_has_the_same_angles),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
