/* Cutting routes into spans; nodes and ends; losses along a span. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

/* R --- P --- T --- E, with a branch T --- D: the main passes T in mid-route. */
static kent_build branched(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 30.0);
    kent_build_point(&b, "P", 300.0, 0.0, 20.0);
    kent_build_point(&b, "T", 700.0, 0.0, 10.0);
    kent_build_point(&b, "E", 1000.0, 0.0, 5.0);
    kent_build_point(&b, "D", 700.0, 200.0, 8.0);
    kent_build_pipe(&b, "A", "R P T E", 0.6, 1000.0);
    kent_build_pipe(&b, "C", "T D", 0.15, 1200.0);
    kent_build_fixed_level(&b, "R", 80.0);
    kent_build_outflow(&b, "E", 0.1);
    return b;
}

static void a_route_is_cut_where_another_pipe_meets_it(void **state)
{
    (void)state;
    kent_build b = branched();
    kent_build_derive(&b);
    const kent_model *m = b.model;
    assert_int_equal(m->span_count, 3);
    assert_string_equal(m->spans[0].id, "A.1");
    assert_string_equal(m->spans[1].id, "A.2");
    assert_string_equal(m->spans[2].id, "C"); /* uncut: keeps its id */
    assert_int_equal(m->spans[0].route_count, 3);
    assert_int_equal(m->spans[0].pipe, 0);
    assert_int_equal(m->spans[1].pipe, 0);
    kent_build_clear(&b);
}

static void points_in_between_are_no_nodes(void **state)
{
    (void)state;
    kent_build b = branched();
    kent_build_derive(&b);
    const kent_model *m = b.model;
    assert_int_equal(m->node_count, 4); /* R T E D */
    for (size_t n = 0; n < m->node_count; n++) {
        assert_int_not_equal(m->nodes[n].point, kent_model_point_index(m, "P"));
    }
    const kent_node *tee = &m->nodes[kent_build_node_of(&b, "T")];
    assert_int_equal(tee->end_count, 3);
    assert_int_equal(tee->kind, KENT_NODE_JUNCTION);
    const kent_node *level = &m->nodes[kent_build_node_of(&b, "R")];
    assert_int_equal(level->kind, KENT_NODE_FIXED_LEVEL);
    assert_int_equal(m->fixed_levels[0].node, kent_build_node_of(&b, "R"));
    assert_int_equal(m->nodes[m->outflows[0].node].kind, KENT_NODE_OUTFLOW);
    kent_build_clear(&b);
}

static void span_lengths_add_up_to_the_pipe(void **state)
{
    (void)state;
    kent_build b = branched();
    b.model->pipes[0].length = 1100.0;
    kent_build_derive(&b);
    const kent_span *a = &b.model->spans[0];
    assert_close(a[0].length + a[1].length, 1100.0, 1e-14);
    assert_close(a[0].area, acos(-1.0) * 0.36 / 4.0, 1e-14);
    kent_build_clear(&b);
}

static void minor_losses_are_shared_by_length(void **state)
{
    (void)state;
    kent_build b = branched();
    b.model->pipes[0].loss = 2.0;
    kent_build_derive(&b);
    const kent_span *a = &b.model->spans[0];
    assert_close(a[0].loss + a[1].loss, 2.0, 1e-14);
    assert_close(a[0].loss / a[1].loss, a[0].length / a[1].length, 1e-14);
    kent_build_clear(&b);
}

static void an_in_line_valve_has_two_nodes_in_the_direction_of_the_route(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "V", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R V E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    const int v = kent_build_valve(&b, "V1", "V", 0.1, (double)NAN);
    kent_build_derive(&b);
    const kent_model *m = b.model;
    assert_int_equal(m->span_count, 2);
    assert_int_equal(m->valves[v].node[0], m->spans[0].node[1]);
    assert_int_equal(m->valves[v].node[1], m->spans[1].node[0]);
    for (int side = 0; side < 2; side++) {
        const kent_node *node = &m->nodes[m->valves[v].node[side]];
        assert_int_equal(node->kind, KENT_NODE_VALVE);
        assert_int_equal(node->device, v);
        assert_int_equal(node->end_count, 1);
    }
    kent_build_clear(&b);
}

static void a_valve_between_two_pipes_is_passed_as_they_run(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "V", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_pipe(&b, "B", "V E", 0.3, 1000.0); /* the leaving one listed first */
    kent_build_pipe(&b, "A", "R V", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    const int v = kent_build_valve(&b, "V1", "V", 0.1, (double)NAN);
    kent_build_derive(&b);
    const kent_model *m = b.model;
    const int a = kent_build_span_of(&b, "A"), leaving = kent_build_span_of(&b, "B");
    assert_int_equal(m->valves[v].node[0], m->spans[a].node[1]);
    assert_int_equal(m->valves[v].node[1], m->spans[leaving].node[0]);
    kent_build_clear(&b);
}

static void a_discharging_valve_has_one_node(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "V", 100.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R V", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    const int v = kent_build_valve(&b, "V1", "V", 0.1, 2.0);
    kent_build_derive(&b);
    assert_int_equal(b.model->node_count, 2);
    assert_int_equal(b.model->valves[v].node[0], b.model->spans[0].node[1]);
    assert_int_equal(b.model->valves[v].node[1], -1);
    kent_build_clear(&b);
}

static void two_pipes_may_run_side_by_side(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "J", 100.0, 0.0, 0.0);
    kent_build_point(&b, "K", 50.0, 40.0, 0.0);
    kent_build_pipe(&b, "A", "R J", 0.3, 1000.0);
    kent_build_pipe(&b, "B", "R K J", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_derive(&b);
    assert_int_equal(b.model->node_count, 2);
    assert_int_equal(b.model->nodes[0].end_count, 2);
    assert_int_equal(b.model->nodes[1].end_count, 2);
    kent_build_clear(&b);
}

static void the_level_between_points_is_a_straight_line(void **state)
{
    (void)state;
    kent_build b = branched();
    kent_build_derive(&b);
    const kent_span *a = &b.model->spans[0]; /* R P T: 30, 20, 10 m */
    const double leg = hypot(300.0, 10.0);
    assert_close(kent_span_level(b.model, a, 0.0), 30.0, 1e-14);
    assert_close(kent_span_level(b.model, a, 0.5 * leg), 25.0, 1e-14);
    assert_close(kent_span_level(b.model, a, leg), 20.0, 1e-14);
    assert_close(kent_span_level(b.model, a, a->length), 10.0, 1e-14);
    kent_build_clear(&b);
}

static void loss_is_friction_and_minor_losses_with_the_sign_of_the_flow(void **state)
{
    (void)state;
    kent_build b = branched();
    b.model->pipes[0].friction = KENT_DARCY_FIXED;
    b.model->pipes[0].friction_coefficient = 0.02;
    b.model->pipes[0].loss = 3.0;
    kent_build_derive(&b);
    const kent_span *a = &b.model->spans[0];
    const double speed = 0.4 / a->area;
    const double want =
        (0.02 * a->length / 0.6 + a->loss) * speed * speed / (2.0 * b.model->gravity);
    double slope = 0.0;
    assert_close(kent_span_loss(b.model, a, 0.4, &slope), want, 1e-12);
    assert_close(kent_span_loss(b.model, a, -0.4, NULL), -want, 1e-12);
    assert_close(slope, 2.0 * want / 0.4, 1e-9); /* a square law */
    kent_build_clear(&b);
}

static void the_wave_speed_comes_from_the_wall_where_none_is_given(void **state)
{
    (void)state;
    kent_build b = branched();
    b.model->pipes[0].wave_speed = (double)NAN;
    b.model->pipes[0].thin_wall = true;
    kent_build_derive(&b);
    /* a = sqrt(K/rho) / sqrt(1 + K D/(E e)), free joints, thin wall */
    const double want =
        sqrt(2.2e9 / 1000.0) / sqrt(1.0 + 2.2e9 * 0.6 / (170.0e9 * 0.01));
    assert_close(b.model->spans[0].wave_speed, want, 1e-12);
    assert_close(b.model->spans[2].wave_speed, 1200.0, 1e-15);
    kent_build_clear(&b);
}

/* By hand: 0.1 % at one atmosphere under 92 - 40 m of water at the middle, gauge. The
 * wall yields as before. Above the highest level the pressure is barometric. */
static void free_gas_slows_waves_by_the_still_pressure_of_each_span(void **state)
{
    (void)state;
    for (int high = 0; high < 2; high++) {
        const double z = high ? 120.0 : 30.0;
        kent_build b = kent_build_new();
        (void)kent_build_point(&b, "R", 0.0, 0.0, z);
        (void)kent_build_point(&b, "E", 800.0, 0.0, z + 20.0);
        (void)kent_build_pipe(&b, "A", "R E", 0.6, (double)NAN);
        (void)kent_build_fixed_level(&b, "R", 92.0);
        (void)kent_build_fixed_level(&b, "E", 60.0);
        b.model->pipes[0].thin_wall = true;
        b.model->gas_content = 1e-3;
        kent_build_derive(&b);
        const double p = 101325.0 + (high ? 0.0 : 1000.0 * 9.80665 * 52.0);
        const double x = 1e-3 * 101325.0 / p;
        const double k = 1.0 / ((1.0 - x) / 2.2e9 + x / p);
        const double want =
            sqrt(k / (1000.0 * (1.0 - x))) / sqrt(1.0 + k * 0.6 / (170.0e9 * 0.01));
        assert_close(kent_span_still_pressure(b.model, &b.model->spans[0]), p, 1e-12);
        assert_close(b.model->spans[0].wave_speed, want, 1e-12);
        assert_int_equal(b.model->cautions.count, 1);
        assert_non_null(strstr(b.model->cautions.text[0], "free gas of 0.1 %"));
        kent_build_clear(&b);
    }
}

/* A state in which the water stands higher presses the gas together the more. */
static void free_gas_is_pressed_by_the_highest_level_of_any_state(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 40.0);
    (void)kent_build_point(&b, "E", 800.0, 0.0, 40.0);
    (void)kent_build_pipe(&b, "A", "R E", 0.6, (double)NAN);
    (void)kent_build_fixed_level(&b, "R", 92.0);
    b.model->state_levels = kent_alloc(2, sizeof *b.model->state_levels);
    assert_non_null(b.model->state_levels);
    b.model->state_levels[0] = (kent_state_level){.fixed_level = 0, .level = 80.0};
    b.model->state_levels[1] = (kent_state_level){.fixed_level = 0, .level = 100.0};
    b.model->state_level_count = 2;
    b.model->gas_content = 1e-3;
    kent_build_derive(&b);
    assert_close(kent_span_still_pressure(b.model, &b.model->spans[0]),
                 101325.0 + 1000.0 * 9.80665 * 60.0, 1e-12);
    kent_build_clear(&b);
}

static void a_given_wave_speed_stays_whatever_gas_there_is(void **state)
{
    (void)state;
    kent_build b = branched();
    b.model->gas_content = 1e-3;
    kent_build_derive(&b);
    assert_close(b.model->spans[0].wave_speed, b.model->pipes[0].wave_speed, 0.0);
    for (size_t i = 0; i < b.model->cautions.count; i++) {
        assert_null(strstr(b.model->cautions.text[i], "gas"));
    }
    kent_build_clear(&b);
}

/* A tank at R, demands where lines end: D1 .. D8. */
static kent_build comb(size_t ends)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_fixed_level(&b, "R", 60.0);
    for (size_t i = 1; i <= ends; i++) {
        char id[8], pipe[8], route[16];
        (void)snprintf(id, sizeof id, "D%zu", i);
        (void)snprintf(pipe, sizeof pipe, "P%zu", i);
        (void)snprintf(route, sizeof route, "R %s", id);
        kent_build_point(&b, id, 100.0, 10.0 * (double)i, 0.0);
        kent_build_pipe(&b, pipe, route, 0.3, 1000.0);
        kent_build_outflow(&b, id, 0.01);
    }
    return b;
}

static const char *caution_of_ends(const kent_build *b)
{
    const char *found = NULL;
    for (size_t i = 0; i < b->model->cautions.count; i++) {
        const char *text = b->model->cautions.text[i];
        if (!strstr(text, "the pipe is taken to go on")) continue;
        assert_null(found); /* one sentence for all */
        found = text;
    }
    return found;
}

static void an_end_that_draws_makes_no_fitting_and_says_so(void **state)
{
    (void)state;
    kent_build one = comb(1);
    kent_build_derive(&one);
    assert_int_equal(one.model->fitting_count, 0);
    const char *said = caution_of_ends(&one);
    assert_non_null(said);
    assert_non_null(strstr(said, "outflow at D1: "));
    assert_non_null(
        strstr(said, "fittings = ( { at = \"D1\"; type = \"dead-end\"; } )"));
    kent_build_clear(&one);

    kent_build many = comb(8);
    kent_build_derive(&many);
    said = caution_of_ends(&many);
    assert_non_null(said);
    assert_non_null(strstr(said, "outflows at D1, D2, D3, D4, D5, D6 and 2 more: "));
    kent_build_clear(&many);
}

static void an_end_that_is_said_or_no_end_is_not_cautioned(void **state)
{
    (void)state;
    kent_build said = comb(1);
    const int note = kent_build_note(&said, "D1");
    said.model->notes[note].type = KENT_DEAD_END;
    kent_build_derive(&said);
    assert_true(kent_build_fitting_of(&said, "D1") >= 0);
    assert_null(caution_of_ends(&said));
    kent_build_clear(&said);

    kent_build midway = kent_build_new();
    kent_build_point(&midway, "R", 0.0, 0.0, 0.0);
    kent_build_point(&midway, "M", 100.0, 0.0, 0.0);
    kent_build_point(&midway, "E", 200.0, 0.0, 0.0);
    kent_build_pipe(&midway, "A", "R M E", 0.3, 1000.0);
    kent_build_fixed_level(&midway, "R", 60.0);
    kent_build_outflow(&midway, "M", 0.01);
    kent_build_derive(&midway);
    assert_null(caution_of_ends(&midway));
    kent_build_clear(&midway);
}

static void deriving_twice_gives_the_same(void **state)
{
    (void)state;
    kent_build b = branched();
    kent_build_derive(&b);
    const size_t spans = b.model->span_count, fittings = b.model->fitting_count;
    kent_build_derive(&b);
    assert_int_equal(b.model->span_count, spans);
    assert_int_equal(b.model->fitting_count, fittings);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(free_gas_is_pressed_by_the_highest_level_of_any_state),
        cmocka_unit_test(a_route_is_cut_where_another_pipe_meets_it),
        cmocka_unit_test(points_in_between_are_no_nodes),
        cmocka_unit_test(span_lengths_add_up_to_the_pipe),
        cmocka_unit_test(minor_losses_are_shared_by_length),
        cmocka_unit_test(an_in_line_valve_has_two_nodes_in_the_direction_of_the_route),
        cmocka_unit_test(a_valve_between_two_pipes_is_passed_as_they_run),
        cmocka_unit_test(a_discharging_valve_has_one_node),
        cmocka_unit_test(two_pipes_may_run_side_by_side),
        cmocka_unit_test(the_level_between_points_is_a_straight_line),
        cmocka_unit_test(loss_is_friction_and_minor_losses_with_the_sign_of_the_flow),
        cmocka_unit_test(the_wave_speed_comes_from_the_wall_where_none_is_given),
        cmocka_unit_test(free_gas_slows_waves_by_the_still_pressure_of_each_span),
        cmocka_unit_test(a_given_wave_speed_stays_whatever_gas_there_is),
        cmocka_unit_test(an_end_that_draws_makes_no_fitting_and_says_so),
        cmocka_unit_test(an_end_that_is_said_or_no_end_is_not_cautioned),
        cmocka_unit_test(deriving_twice_gives_the_same),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
