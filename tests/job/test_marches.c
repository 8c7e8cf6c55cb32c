/* Scenarios marched from several states: each as if the case had been written with that
 * state's levels, outflows and friction outright. */
#include "kent_build.h"
#include "kent_check.h"
#include "kent_job.h"

#include <math.h>
#include <string.h>

enum { NORMAL, LOW, STATES };

/* What a state of the main below comes to. */
typedef struct flow_case {
    double level;    /* m, of the tank */
    double friction; /* Darcy's f */
    double draw;     /* m3/s, at B */
    double capacity; /* m^2.5/s of the valve */
} flow_case;

static const flow_case WRITTEN[STATES] = {{60.0, 0.016, 0.02, 0.05},
                                          {50.0, 0.032, 0.01, 0.05}};

/* 1 km from a tank to a valve that discharges at 20 m, drawn from half-way; a bend lies
 * there. "shut" closes the valve in 2 s, "still" does nothing. */
static kent_build main_as(flow_case given)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 30.0);
    kent_build_point(&b, "B", 500.0, 0.0, 10.0);
    kent_build_point(&b, "E", 900.0, 300.0, 5.0);
    const int p = kent_build_pipe(&b, "A", "R B E", 0.5, 1000.0);
    b.model->pipes[p].friction = KENT_DARCY_FIXED;
    b.model->pipes[p].friction_coefficient = given.friction;
    kent_build_fixed_level(&b, "R", given.level);
    kent_build_outflow(&b, "B", given.draw);
    const int valve = kent_build_valve(&b, "V", "E", given.capacity, 20.0);
    kent_build_ramp(&b, kent_build_scenario(&b, "shut", 12.0), KENT_EVENT_VALVE, valve,
                    0.5, 2.0, 0.0);
    kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
    return b;
}

/* The same main with both flow cases as states of the first. */
static kent_build main_with_states(void)
{
    kent_build b = main_as(WRITTEN[NORMAL]);
    kent_build_state(&b, "normal");
    const int low = kent_build_state(&b, "low");
    kent_build_state_level(&b, low, 0, WRITTEN[LOW].level);
    b.model->states[low].outflow_factor = 0.5;
    b.model->states[low].roughness_factor = 2.0;
    return b;
}

static kent_results *run(kent_build *b, const kent_job_options *options)
{
    kent_error err = {0};
    kent_results *r = NULL;
    kent_build_derive(b);
    if (kent_job_run(b->model, options, &r, &err)) {
        fail_msg("%s: %s", err.where, err.what);
    }
    return r;
}

static const kent_load_case *case_of(const kent_results *r, size_t fitting,
                                     const char *name, int state)
{
    const kent_fitting_loads *loads = &r->loads->fittings[fitting];
    for (size_t i = 0; i < loads->count; i++) {
        const kent_load_case *c = &loads->cases[i];
        if (strcmp(c->name, name) == 0 && c->state == state) return c;
    }
    fail_msg("fitting %zu has no case \"%s\" of state %d", fitting, name, state);
    return NULL;
}

/* Fails unless both cases push alike in every sense, to the last bit. */
static void assert_same_case(const kent_load_case *a, const kent_load_case *b)
{
    for (int k = 0; k < KENT_SENSES; k++) {
        const kent_instant *x = &a->worst[k], *y = &b->worst[k];
        assert_int_equal(x->set, y->set);
        if (!x->set) continue;
        assert_memory_equal(&x->balance.thrust, &y->balance.thrust, sizeof(kent_vec3));
        assert_memory_equal(&x->time, &y->time, sizeof x->time);
    }
    assert_memory_equal(&a->above_90_percent, &b->above_90_percent, sizeof(double));
}

/* Fails unless march i of r is to the last bit the one march of alone. */
static void assert_same_march(const kent_results *r, size_t i,
                              const kent_results *alone)
{
    const kent_model *m = r->model;
    const kent_scenario_result *x = &r->scenarios[i], *y = &alone->scenarios[0];
    const size_t places = r->history_count * sizeof(double);
    assert_memory_equal(x->points, y->points, m->point_count * sizeof *x->points);
    assert_int_equal(x->history.rows, y->history.rows);
    assert_memory_equal(x->history.head, y->history.head, x->history.rows * places);
    assert_memory_equal(x->history.flow, y->history.flow, x->history.rows * places);
    assert_memory_equal(&x->uncertainty, &y->uncertainty, sizeof(double));
    for (size_t f = 0; f < m->fitting_count; f++) {
        assert_same_case(case_of(r, f, "shut", x->state), case_of(alone, f, "shut", 0));
        assert_same_case(case_of(r, f, "steady", x->state),
                         case_of(alone, f, "steady", 0));
    }
}

static void a_march_is_that_of_the_state_written_outright(void **state)
{
    (void)state;
    kent_build b = main_with_states();
    kent_results *r = run(&b, &(kent_job_options){.threads = 2});
    assert_int_equal(r->steady_count, STATES);
    assert_int_equal(r->scenario_count, STATES);
    for (size_t i = 0; i < STATES; i++) {
        kent_build one = main_as(WRITTEN[i]);
        kent_results *alone = run(&one, &(kent_job_options){.threads = 1});
        assert_int_equal(r->scenarios[i].state, (int)i);
        assert_same_march(r, i, alone);
        kent_results_free(alone);
        kent_build_clear(&one);
    }
    /* and the two differ, so that the above says something */
    assert_true(r->scenarios[LOW].points[2].highest_head <
                r->scenarios[NORMAL].points[2].highest_head - 1.0);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* A valve of a stated flow has one capacity, found in the first state. */
static void a_stated_flow_is_marched_with_the_capacity_of_the_first_state(void **state)
{
    (void)state;
    kent_build b = main_with_states();
    b.model->valves[0].capacity = (double)NAN;
    b.model->valves[0].flow = 0.25;
    kent_results *r = run(&b, &(kent_job_options){.threads = 1});
    const double found = r->steadies[NORMAL]->valve_capacity[0];
    assert_close(r->steadies[NORMAL]->valve_flow[0], 0.25, 1e-12);
    assert_true(r->steadies[LOW]->valve_flow[0] < 0.24);
    flow_case low = WRITTEN[LOW];
    low.capacity = found;
    kent_build one = main_as(low);
    kent_results *alone = run(&one, &(kent_job_options){.threads = 1});
    assert_same_march(r, LOW, alone);
    kent_results_free(alone);
    kent_build_clear(&one);
    kent_results_free(r);
    kent_build_clear(&b);
}

static void nothing_moves_in_any_state_without_an_event(void **state)
{
    (void)state;
    kent_build b = main_with_states();
    kent_build_scenario(&b, "still", 20.0);
    const int still = 1;
    kent_results *r = run(
        &b,
        &(kent_job_options){.scenarios = &still, .scenario_count = 1, .threads = 1});
    assert_int_equal(r->scenario_count, STATES);
    for (size_t i = 0; i < STATES; i++) {
        const kent_scenario_result *s = &r->scenarios[i];
        assert_int_equal(s->scenario, still);
        for (size_t p = 0; p < b.model->point_count; p++) {
            const int node = kent_build_node_of(&b, b.model->points[p].id);
            const double steady = r->steadies[i]->node_head[node];
            assert_within(s->points[p].highest_head, steady, 1e-9);
            assert_within(s->points[p].lowest_head, steady, 1e-9);
        }
    }
    kent_results_free(r);
    kent_build_clear(&b);
}

static void a_scenario_is_marched_from_the_states_it_names(void **state)
{
    (void)state;
    kent_build b = main_with_states();
    kent_build_starts_from(&b, 0, LOW);
    kent_build_scenario(&b, "still", 2.0);
    kent_results *r = run(&b, &(kent_job_options){.threads = 1});
    assert_int_equal(r->scenario_count, 3);
    const kent_march wanted[] = {{0, LOW}, {1, NORMAL}, {1, LOW}};
    for (int i = 0; i < 3; i++) {
        assert_int_equal(r->scenarios[i].scenario, wanted[i].scenario);
        assert_int_equal(r->scenarios[i].state, wanted[i].state);
    }
    const kent_load_case *c = case_of(r, 0, "shut", LOW);
    assert_string_equal(c->title.s, "shut (low)");
    assert_string_equal(case_of(r, 0, "steady", NORMAL)->title.s, "steady (normal)");
    assert_string_equal(case_of(r, 0, "static", -1)->title.s, "static");
    const kent_fitting_loads *loads = &r->loads->fittings[0];
    for (size_t i = 0; i < loads->count; i++) {
        const bool shut = strcmp(loads->cases[i].name, "shut") == 0;
        assert_false(shut && loads->cases[i].state == NORMAL);
    }
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Still water stands at 60 m, the higher of both tanks' levels, whichever comes first.
 */
static void still_water_stands_at_the_highest_state(void **state)
{
    (void)state;
    kent_build b = main_with_states();
    b.model->fixed_levels[0].level = 40.0; /* now "low" is the higher */
    kent_results *r = run(&b, &(kent_job_options){.threads = 1});
    const int bend = kent_build_fitting_of(&b, "B");
    const kent_load_case *c = case_of(r, (size_t)bend, "static", -1);
    assert_close(c->worst[KENT_RESULTANT].pressure, 40.0 * 9806.65, 1e-12);
    kent_results_free(r);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_march_is_that_of_the_state_written_outright),
        cmocka_unit_test(a_stated_flow_is_marched_with_the_capacity_of_the_first_state),
        cmocka_unit_test(nothing_moves_in_any_state_without_an_event),
        cmocka_unit_test(a_scenario_is_marched_from_the_states_it_names),
        cmocka_unit_test(still_water_stands_at_the_highest_state),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
