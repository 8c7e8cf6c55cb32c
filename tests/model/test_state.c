/* States of a main: which marches they make, what a view of one changes, what stands in
 * it at rest. */
#include "kent_alloc_fail.h"
#include "kent_build.h"
#include "kent_check.h"

#include <stdio.h>

/* R - V - E, tanks at both ends (R 92 m, E 50 m), 20 L/s drawn halfway at K; states
 * "normal", "low" (R 88 m, a third drawn, rougher) and "high" (R 95 m, E 60 m).
 * Scenario "all" starts from every state, "from-low" from one. */
static kent_build three_states(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "K", 400.0, 0.0, 5.0);
    kent_build_point(&b, "V", 500.0, 0.0, 5.0);
    kent_build_point(&b, "E", 900.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R K V", 0.3, 1000.0);
    const int second = kent_build_pipe(&b, "B", "V E", 0.3, 1000.0);
    b.model->pipes[0].friction = KENT_DARCY_FIXED;
    b.model->pipes[0].friction_coefficient = 0.02;
    b.model->pipes[second].friction = KENT_HAZEN_WILLIAMS;
    b.model->pipes[second].friction_coefficient = 130.0;
    const int r = kent_build_fixed_level(&b, "R", 92.0);
    const int e = kent_build_fixed_level(&b, "E", 50.0);
    kent_build_outflow(&b, "K", 0.020);
    const int v = kent_build_valve(&b, "V1", "V", (double)NAN, (double)NAN);
    b.model->valves[v].flow = 0.1;
    kent_build_state(&b, "normal");
    const int low = kent_build_state(&b, "low");
    kent_build_state_level(&b, low, r, 88.0);
    b.model->states[low].outflow_factor = 1.0 / 3.0;
    b.model->states[low].roughness_factor = 2.0;
    const int high = kent_build_state(&b, "high");
    kent_build_state_level(&b, high, r, 95.0);
    kent_build_state_level(&b, high, e, 60.0);
    kent_build_scenario(&b, "all", 10.0);
    kent_build_starts_from(&b, kent_build_scenario(&b, "from-low", 10.0), low);
    return b;
}

static void a_case_without_states_has_one_and_marches_each_scenario(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_scenario(&b, "all", 10.0);
    kent_build_scenario(&b, "shut", 10.0);
    kent_build_derive(&b);
    const kent_model *m = b.model;
    assert_int_equal(m->state_count, 1);
    assert_string_equal(m->states[0].id, "normal");
    assert_int_equal(m->march_count, 2);
    for (int i = 0; i < 2; i++) {
        assert_int_equal(m->marches[i].scenario, i);
        assert_int_equal(m->marches[i].state, 0);
    }
    assert_string_equal(kent_name_in_state(m, "all", 0).s, "all");
    assert_string_equal(kent_march_file_name(m, m->marches[0]).s, "all");
    kent_build_clear(&b);
}

static void marches_go_by_scenario_and_then_by_state(void **state)
{
    (void)state;
    static const struct {
        int scenario, state;
        const char *name, *file;
    } WANTED[] = {{0, 0, "all (normal)", "all-normal"},
                  {0, 1, "all (low)", "all-low"},
                  {0, 2, "all (high)", "all-high"},
                  {1, 1, "from-low (low)", "from-low"}};
    kent_build b = three_states();
    kent_build_derive(&b);
    const kent_model *m = b.model;
    assert_int_equal(m->march_count, 4);
    for (int i = 0; i < 4; i++) {
        const kent_march it = m->marches[i];
        assert_int_equal(it.scenario, WANTED[i].scenario);
        assert_int_equal(it.state, WANTED[i].state);
        const char *id = m->scenarios[it.scenario].id;
        assert_string_equal(kent_name_in_state(m, id, it.state).s, WANTED[i].name);
        assert_string_equal(kent_march_file_name(m, it).s, WANTED[i].file);
    }
    assert_string_equal(kent_name_in_state(m, "test", -1).s, "test");
    kent_build_clear(&b);
}

static void two_marches_never_share_the_name_of_a_file(void **state)
{
    (void)state;
    kent_build b = three_states();
    (void)snprintf(b.model->scenarios[1].id, KENT_ID, "all-high");
    assert_string_equal(
        kent_build_complaint(&b),
        "scenario \"all-high\": its results and those of scenario \"all\" would both "
        "be called \"all-high\"; give one of them another id");
    kent_build_clear(&b);
}

/* Factors that a binary fraction holds are exact; a third is within a bit. */
static void a_view_changes_levels_outflows_and_friction_alone(void **state)
{
    (void)state;
    kent_build b = three_states();
    kent_build_derive(&b);
    const kent_model *m = b.model;
    const int a = kent_build_span_of(&b, "A.1"), c = kent_build_span_of(&b, "B");
    kent_model *low = kent_model_in_state(m, 1, NULL);
    kent_model *high = kent_model_in_state(m, 2, NULL);
    assert_non_null(low);
    assert_non_null(high);
    assert_true(low->fixed_levels[0].level == 88.0);
    assert_true(low->fixed_levels[1].level == 50.0);
    assert_true(high->fixed_levels[0].level == 95.0);
    assert_true(high->fixed_levels[1].level == 60.0);
    assert_close(low->outflows[0].flow, 0.020 / 3.0, 1e-15);
    assert_true(high->outflows[0].flow == 0.020);
    assert_true(low->spans[a].friction.coefficient == 0.04);
    assert_true(low->spans[c].friction.coefficient == 65.0); /* C is divided */
    assert_true(high->spans[c].friction.coefficient == 130.0);
    assert_true(low->spans[a].wave_speed == m->spans[a].wave_speed);
    assert_ptr_equal(low->nodes, m->nodes);
    assert_true(kent_model_is_valid(low) && kent_model_is_valid(high));
    kent_model_view_free(low);
    kent_model_view_free(high);
    /* the main itself stays as it was given */
    assert_true(m->fixed_levels[0].level == 92.0 && m->outflows[0].flow == 0.020);
    assert_true(m->spans[a].friction.coefficient == 0.02);
    kent_build_clear(&b);
}

static void a_capacity_found_takes_the_place_of_the_flow_stated(void **state)
{
    (void)state;
    kent_build b = three_states();
    kent_build_derive(&b);
    const double found = 0.25, unknown = (double)NAN;
    kent_model *view = kent_model_in_state(b.model, 1, &found);
    assert_non_null(view);
    assert_true(view->valves[0].capacity == 0.25 && isnan(view->valves[0].flow));
    kent_model_view_free(view);
    view = kent_model_in_state(b.model, 1, &unknown);
    assert_non_null(view);
    assert_true(isnan(view->valves[0].capacity) && view->valves[0].flow == 0.1);
    kent_model_view_free(view);
    kent_build_clear(&b);
}

/* A level that every state replaces stands nowhere: 92 m is none of low and high. */
static void water_at_rest_stands_at_the_highest_level_of_any_state(void **state)
{
    (void)state;
    kent_build b = three_states();
    b.model->valves[0].opening = 0.0; /* looked through */
    kent_build_derive(&b);
    for (size_t n = 0; n < b.model->node_count; n++) {
        assert_true(kent_static_level(b.model, (int)n) == 95.0);
    }
    kent_build_clear(&b);

    b = three_states();
    b.model->fixed_levels[0].level = 120.0;
    kent_build_derive(&b); /* "normal" leaves it alone */
    assert_true(kent_static_level(b.model, kent_build_node_of(&b, "E")) == 120.0);
    kent_build_clear(&b);

    b = three_states();
    b.model->fixed_levels[0].level = 120.0;
    b.model->states[0].level_count = 1; /* that of "low": now no state does */
    kent_build_derive(&b);
    assert_true(kent_static_level(b.model, kent_build_node_of(&b, "E")) == 95.0);
    b.model->loads.static_level = 101.0; /* stated outright */
    kent_build_derive(&b);
    assert_true(kent_static_level(b.model, kent_build_node_of(&b, "E")) == 101.0);
    kent_build_clear(&b);
}

static int view_once(void *context)
{
    kent_model *view = kent_model_in_state(context, 1, NULL);
    kent_allocations_grant(-1);
    const int made = view ? 0 : -1;
    kent_model_view_free(view);
    return made;
}

static void a_view_may_lack_memory(void **state)
{
    (void)state;
    kent_build b = three_states();
    kent_build_derive(&b);
    assert_true(kent_allocations_needed(view_once, b.model) >= 4);
    kent_model_view_free(NULL);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_case_without_states_has_one_and_marches_each_scenario),
        cmocka_unit_test(marches_go_by_scenario_and_then_by_state),
        cmocka_unit_test(two_marches_never_share_the_name_of_a_file),
        cmocka_unit_test(a_view_changes_levels_outflows_and_friction_alone),
        cmocka_unit_test(a_capacity_found_takes_the_place_of_the_flow_stated),
        cmocka_unit_test(water_at_rest_stands_at_the_highest_level_of_any_state),
        cmocka_unit_test(a_view_may_lack_memory),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
