/* Where pumps, valves, tanks and vessels stand in the network, and what follows. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <string.h>

/* P (pump) --- K --- L --- R, level 100 m at R; K and L lie inside the route. */
static kent_build pumped(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "P", 0.0, 0.0, 40.0);
    kent_build_point(&b, "K", 100.0, 0.0, 42.0);
    kent_build_point(&b, "L", 400.0, 0.0, 50.0);
    kent_build_point(&b, "R", 900.0, 0.0, 95.0);
    kent_build_pipe(&b, "A", "P K L R", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 100.0);
    const int p = kent_build_pump(&b, "PS", "P", NULL, 130.0, 0.14, 97.0);
    b.model->pumps[p].suction_level = 41.0;
    return b;
}

/* The one device of that name. */
static const kent_device *device(const kent_build *b, const char *id)
{
    const int index = kent_model_device_index(b->model, id);
    assert_true(index >= 0);
    return &b->model->devices[index];
}

/* Whether a node's list names a device. */
static bool stands_at(const kent_build *b, int node, const char *id)
{
    const kent_model *m = b->model;
    const kent_node *n = &m->nodes[node];
    for (size_t k = 0; k < n->stand_count; k++) {
        if (strcmp(m->devices[m->stands[n->stand_first + k]].id, id) == 0) return true;
    }
    return false;
}

static int point_of(const kent_build *b, int node)
{
    return b->model->nodes[node].point;
}

static void note_type(kent_build *b, const char *at, kent_fitting_type type)
{
    const int note = kent_build_note(b, at);
    b->model->notes[note].type = (int)type;
}

static void a_pump_from_a_level_has_one_node_and_is_no_fitting(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_build_derive(&b);
    const kent_model *m = b.model;
    const kent_device *d = device(&b, "PS");
    assert_int_equal(m->device_count, 1);
    assert_int_equal(d->node[0], -1);
    assert_int_equal(d->node[1], kent_build_node_of(&b, "P"));
    assert_int_equal(m->pumps[0].node[1], d->node[1]);
    assert_int_equal(m->nodes[d->node[1]].kind, KENT_NODE_JUNCTION);
    assert_int_equal(m->nodes[d->node[1]].device, -1);
    assert_true(stands_at(&b, d->node[1], "PS"));
    assert_int_equal(m->stand_count, 1);
    assert_int_equal(m->span_count, 1); /* nothing else cuts the pipe */
    assert_int_equal(kent_model_fitting_of(m, "P"), -1);
    kent_build_clear(&b);
}

static void a_note_makes_the_end_at_a_pump_a_dead_end(void **state)
{
    (void)state;
    kent_build b = pumped();
    note_type(&b, "P", KENT_DEAD_END);
    kent_build_derive(&b);
    const kent_fitting *f = &b.model->fittings[kent_build_fitting_of(&b, "P")];
    assert_int_equal(f->type, KENT_DEAD_END);
    assert_int_equal(f->valve, -1);
    assert_int_equal(f->device, -1);
    kent_build_clear(&b);
}

static void a_device_in_line_parts_the_pipe_by_its_flow(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_build_check_valve(&b, "NR", "K", "L");
    kent_build_check_valve(&b, "BACK", "L", "K"); /* against the route */
    kent_build_derive(&b);
    const kent_model *m = b.model;
    const kent_device *d = device(&b, "NR"), *back = device(&b, "BACK");
    assert_int_equal(m->span_count, 3);
    assert_int_equal(m->spans[0].node[1], d->node[0]);
    assert_int_equal(m->spans[1].node[0], d->node[1]);
    assert_int_equal(m->spans[1].node[1], back->node[1]); /* it delivers to K */
    assert_int_equal(m->spans[2].node[0], back->node[0]);
    assert_int_not_equal(d->node[0], d->node[1]);
    assert_int_equal(m->check_valves[1].node[1], back->node[1]);
    for (int side = 0; side < 2; side++) {
        assert_int_equal(m->nodes[d->node[side]].kind, KENT_NODE_JUNCTION);
        assert_true(stands_at(&b, d->node[side], "NR"));
    }
    assert_int_equal(m->stand_count, 5);
    kent_build_clear(&b);
}

static void what_stands_beside_a_point_cuts_the_pipe_there(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_build_air_vessel(&b, "V", "K", 10.0, 4.0);
    kent_build_air_valve(&b, "A", "K", 0.1, 0.01);
    kent_build_derive(&b);
    const kent_model *m = b.model;
    const int node = kent_build_node_of(&b, "K");
    assert_int_equal(m->span_count, 2);
    assert_int_equal(device(&b, "V")->node[0], node);
    assert_int_equal(device(&b, "V")->node[1], -1);
    assert_int_equal(m->air_vessels[0].node, node);
    assert_int_equal(m->air_valves[0].node, node);
    assert_int_equal(m->nodes[node].stand_count, 2);
    assert_true(stands_at(&b, node, "V") && stands_at(&b, node, "A"));
    assert_int_equal(kent_model_fitting_of(m, "K"), -1); /* nothing turns there */
    kent_build_clear(&b);
}

/* Delivery side unless next_to says otherwise; of a plain valve it has to. */
static void beside_a_device_in_line_it_is_on_one_side(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_build_check_valve(&b, "NR", "K", "L");
    kent_build_valve(&b, "G", "L", 0.1, (double)NAN);
    kent_model *m = b.model;
    kent_build_air_vessel(&b, "V", "K", 10.0, 4.0);
    kent_build_surge_tank(&b, "T", "K", 3.0);
    m->surge_tanks[0].next_to = kent_model_point_index(m, "P");
    kent_build_air_valve(&b, "A", "L", 0.1, 0.01);
    m->air_valves[0].next_to = kent_model_point_index(m, "R");
    kent_build_derive(&b);
    assert_int_equal(device(&b, "V")->node[0], device(&b, "NR")->node[1]);
    assert_int_equal(device(&b, "T")->node[0], device(&b, "NR")->node[0]);
    assert_int_equal(device(&b, "A")->node[0], m->valves[0].node[1]);
    assert_int_equal(m->nodes[m->valves[0].node[1]].kind, KENT_NODE_VALVE);
    assert_int_equal(point_of(&b, device(&b, "A")->node[0]),
                     kent_model_point_index(m, "L"));
    kent_build_clear(&b);
}

static void heads_reach_through_what_lets_water_pass(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_build_check_valve(&b, "NR", "K", "L");
    b.model->pumps[0].suction_level = 120.0; /* above the reservoir */
    kent_build_derive(&b);
    const kent_model *m = b.model;
    for (size_t n = 0; n < m->node_count; n++) {
        assert_close(m->highest_level[n], 120.0, 1e-15);
    }
    m->pumps[0].suction_level = 41.0;
    kent_build_derive(&b);
    assert_close(b.model->highest_level[0], 100.0, 1e-15);
    kent_build_clear(&b);
}

/* 9.15 by hand, from heads at no flow: P stands on its suction level, the booster at L
 * on what P raises the water to; K's check valve keeps the booster's from P's side. */
static void pumps_at_no_flow_raise_the_water(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_model *m = b.model;
    kent_build_check_valve(&b, "NR", "K", "L");
    const int booster = kent_build_pump(&b, "B", "L", "R", 30.0, 0.1, 20.0);
    m->pumps[0].suction_level = 41.0;
    const double first = 41.0 + 130.0;
    kent_build_derive(&b);
    assert_int_equal(m->span_count, 3);
    assert_close(kent_shut_off_level(m, 0), first, 1e-12);
    assert_close(kent_shut_off_level(m, 1), first, 1e-12);
    assert_close(kent_shut_off_level(m, 2), first + 30.0, 1e-12);
    assert_true(isnan(m->shut_off_level[m->fixed_levels[0].node]));
    assert_close(m->shut_off_level[m->check_valves[0].node[0]], first, 1e-12);

    m->pumps[booster].check_valve = KENT_CHECK_NONE; /* its own head stays behind it */
    kent_build_derive(&b);
    assert_close(kent_shut_off_level(m, 1), first, 1e-12);
    assert_close(kent_shut_off_level(m, 2), first + 30.0, 1e-12);
    m->pumps[booster].curve.head[0] = 1.0;
    m->fixed_levels[0].level = 100.0;
    m->pumps[0].suction_level = -500.0; /* the reservoir is higher: it counts in line */
    kent_build_derive(&b);
    assert_close(kent_shut_off_level(m, 2), 101.0, 1e-12);
    kent_build_clear(&b);
}

/* A main with no fixed level at all on the pump's side of a shut valve. */
static void a_suction_level_ties_the_heads_beyond_its_pump(void **state)
{
    (void)state;
    kent_build b = pumped();
    const int v = kent_build_valve(&b, "G", "L", 0.1, (double)NAN);
    b.model->valves[v].opening = 0.0;
    kent_build_derive(&b); /* P and K are not cut off */
    kent_build_clear(&b);
}

static void check_and_control_valves_are_valve_fittings(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_build_check_valve(&b, "NR", "K", "L");
    kent_build_control_valve(&b, "PR", "L", "R", KENT_HOLDS_DOWNSTREAM, 4e5);
    kent_build_derive(&b);
    const kent_model *m = b.model;
    const kent_fitting *nr = &m->fittings[kent_build_fitting_of(&b, "K")];
    const kent_fitting *pr = &m->fittings[kent_build_fitting_of(&b, "L")];
    assert_int_equal(nr->type, KENT_VALVE);
    assert_int_equal(nr->valve, -1);
    assert_int_equal(nr->device, kent_model_device_index(m, "NR"));
    assert_int_equal(pr->device, kent_model_device_index(m, "PR"));
    assert_int_equal(nr->restraint, KENT_ANCHOR_BLOCK);
    /* Port 0 is upstream by the route: a check valve shuts on port 1 alone. */
    assert_false(kent_fitting_shuts(m, nr, 0));
    assert_true(kent_fitting_shuts(m, nr, 1));
    assert_true(kent_fitting_shuts(m, pr, 0));
    assert_true(kent_fitting_shuts(m, pr, 1));
    kent_build_clear(&b);
}

/* A pump between two levels, at K. */
static kent_build boosted(kent_check_kind check)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "S", 0.0, 0.0, 40.0);
    kent_build_point(&b, "K", 100.0, 0.0, 40.0);
    kent_build_point(&b, "R", 900.0, 0.0, 95.0);
    kent_build_pipe(&b, "A", "S K R", 0.3, 1000.0);
    kent_build_fixed_level(&b, "S", 60.0);
    kent_build_fixed_level(&b, "R", 100.0);
    const int p = kent_build_pump(&b, "PB", "K", "R", 130.0, 0.14, 97.0);
    b.model->pumps[p].check_valve = check;
    return b;
}

static bool is_cautioned(const kent_build *b, const char *words)
{
    const kent_notes *notes = &b->model->cautions;
    for (size_t i = 0; i < notes->count; i++) {
        if (strstr(notes->text[i], words)) return true;
    }
    return false;
}

static void the_tee_of_what_stands_beside_is_asked_for(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_build_air_vessel(&b, "V", "K", 10.0, 4.0);
    kent_build_relief_valve(&b, "RV", "P", 1e6, 0.1);
    kent_build_derive(&b);
    assert_true(is_cautioned(&b, "the branches that lead to V at K, RV at P push on"));
    kent_build_clear(&b);

    b = pumped();
    kent_build_air_vessel(&b, "V", "K", 10.0, 4.0);
    const int index = kent_build_note(&b, "K");
    kent_fitting_note *note = &b.model->notes[index];
    note->branch.end = KENT_BRANCH_VALVE;
    note->branch.outside_diameter = 0.2;
    note->branch.direction = (kent_vec3){0.0, 1.0, 0.0};
    kent_build_derive(&b);
    assert_false(is_cautioned(&b, "the branches that lead to"));
    kent_build_clear(&b);
}

/* 2 of 3 units run: 3 cannot trip, 2 cannot be started, unless others are before. */
static void an_event_of_more_units_than_there_are_is_cautioned(void **state)
{
    (void)state;
    static const struct {
        kent_action action;
        int units;
        const char *words; /* NULL: none */
    } CASES[] = {{KENT_TRIP, 2, NULL},
                 {KENT_TRIP, 3,
                  "3 units of pump PS, and in no state that it starts "
                  "from do more than 2 run"},
                 {KENT_START, 1, NULL},
                 {KENT_START, 2, "do more than 1 stand still"}};
    for (size_t i = 0; i < sizeof CASES / sizeof CASES[0]; i++) {
        kent_build b = pumped();
        kent_model *m = b.model;
        m->pumps[0].in_parallel = 3;
        m->pumps[0].running = 2;
        const int s = kent_build_scenario(&b, "cut", 20.0);
        kent_build_ramp(&b, s, KENT_EVENT_PUMP, 0, 1.0, 1.0, 1.0);
        m->events[0].action = CASES[i].action;
        m->events[0].how_many = CASES[i].units;
        kent_build_derive(&b);
        const char *words = CASES[i].words ? CASES[i].words : "an event is of";
        assert_int_equal(is_cautioned(&b, words), CASES[i].words != NULL);
        kent_build_clear(&b);
    }
}

static void a_pump_in_line_is_a_valve_where_a_note_says_so(void **state)
{
    (void)state;
    kent_build b = boosted(KENT_CHECK_IDEAL);
    kent_build_derive(&b);
    assert_int_equal(kent_model_fitting_of(b.model, "K"), -1);
    assert_non_null(strstr(b.model->cautions.text[0], "pumps (PB) are no fittings"));
    note_type(&b, "K", KENT_VALVE);
    kent_build_derive(&b);
    const kent_fitting *f = &b.model->fittings[kent_build_fitting_of(&b, "K")];
    assert_int_equal(f->device, kent_model_device_index(b.model, "PB"));
    assert_false(kent_fitting_shuts(b.model, f, 0));
    assert_true(kent_fitting_shuts(b.model, f, 1));
    kent_build_clear(&b);

    b = boosted(KENT_CHECK_NONE);
    note_type(&b, "K", KENT_VALVE);
    kent_build_refused(&b, "no valve stands there", 800);
}

static void a_state_says_how_many_units_run(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_model *m = b.model;
    m->pumps[0].in_parallel = m->pumps[0].running = 3;
    kent_build_state(&b, "all");
    const int one = kent_build_state(&b, "one");
    m->state_running = kent_alloc(1, sizeof *m->state_running);
    assert_non_null(m->state_running);
    m->state_running[m->state_running_count++] = (kent_state_running){0, 1};
    m->states[one].running_count = 1;
    kent_build_derive(&b);
    kent_model *view = kent_model_in_state(m, one, NULL);
    assert_non_null(view);
    assert_int_equal(view->pumps[0].running, 1);
    assert_int_equal(m->pumps[0].running, 3); /* left as it was */
    kent_model_view_free(view);
    kent_build_clear(&b);
}

static void a_model_with_a_device_out_of_place_is_not_valid(void **state)
{
    (void)state;
    kent_build b = pumped();
    kent_build_check_valve(&b, "NR", "K", "L");
    kent_build_air_vessel(&b, "V", "L", 10.0, 4.0);
    kent_build_derive(&b);
    kent_model *m = b.model;
    assert_true(kent_model_is_valid(m));
    kent_device *d = &m->devices[kent_model_device_index(m, "V")];
    const int node = d->node[0];
    d->node[0] = -1;
    assert_false(kent_model_is_valid(m));
    d->node[0] = node;
    m->pumps[0].running = 2; /* of one */
    assert_false(kent_model_is_valid(m));
    m->pumps[0].running = 1;
    m->air_vessels[0].gas_volume = 10.0;
    assert_false(kent_model_is_valid(m));
    m->air_vessels[0].gas_volume = 4.0;
    assert_true(kent_model_is_valid(m));
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_pump_from_a_level_has_one_node_and_is_no_fitting),
        cmocka_unit_test(a_note_makes_the_end_at_a_pump_a_dead_end),
        cmocka_unit_test(a_device_in_line_parts_the_pipe_by_its_flow),
        cmocka_unit_test(what_stands_beside_a_point_cuts_the_pipe_there),
        cmocka_unit_test(beside_a_device_in_line_it_is_on_one_side),
        cmocka_unit_test(heads_reach_through_what_lets_water_pass),
        cmocka_unit_test(pumps_at_no_flow_raise_the_water),
        cmocka_unit_test(a_suction_level_ties_the_heads_beyond_its_pump),
        cmocka_unit_test(check_and_control_valves_are_valve_fittings),
        cmocka_unit_test(the_tee_of_what_stands_beside_is_asked_for),
        cmocka_unit_test(an_event_of_more_units_than_there_are_is_cautioned),
        cmocka_unit_test(a_pump_in_line_is_a_valve_where_a_note_says_so),
        cmocka_unit_test(a_state_says_how_many_units_run),
        cmocka_unit_test(a_model_with_a_device_out_of_place_is_not_valid),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
