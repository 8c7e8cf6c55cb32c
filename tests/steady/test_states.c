/* Every state of a main solved for itself, against closed forms of one pipe: what flows
 * where only the level, the friction or what is drawn differs.
 *
 * (1 + K + f L/D) V2/2g = difference of levels: Darcy and Weisbach with the losses of
 * inlet and outlet, any textbook of hydraulics. Hazen and Williams' exponent 1.852 from
 * memory, as in test_friction. */
#include "kent_alloc_fail.h"
#include "kent_build.h"
#include "kent_check.h"
#include "kent_steady.h"

#include <math.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double G = 9.80665;

enum { STATES = 4 };

typedef struct solved {
    kent_build build;
    kent_steady *of[STATES];
} solved;

static solved solve(kent_build build)
{
    solved s = {.build = build};
    kent_error err = {0};
    kent_build_derive(&s.build);
    assert_true(build.model->state_count <= STATES);
    if (kent_steady_solve_states(build.model, s.of, &err)) fail_msg("%s", err.what);
    return s;
}

static void clear(solved *s)
{
    for (size_t i = 0; i < STATES; i++) {
        kent_steady_free(s->of[i]);
    }
    kent_build_clear(&s->build);
}

/* One pipe A, 1500 m of 500 mm with f = 0.018, from R (60 m, K = 0.5) to S (42 m). */
static kent_build one_pipe(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "S", 1500.0, 0.0, 10.0);
    const int p = kent_build_pipe(&b, "A", "R S", 0.5, 1000.0);
    b.model->pipes[p].friction = KENT_DARCY_FIXED;
    b.model->pipes[p].friction_coefficient = 0.018;
    const int level = kent_build_fixed_level(&b, "R", 60.0);
    b.model->fixed_levels[level].loss = 0.5;
    return b;
}

/* m3/s of that pipe under a head (m) with its friction times a factor. */
static double flow_by_hand(double head, double factor)
{
    const double v = sqrt(2.0 * G * head / (1.5 + factor * 0.018 * 1500.0 / 0.5));
    return v * PI / 4.0 * 0.25;
}

static void each_state_flows_by_its_own_levels_and_friction(void **state)
{
    (void)state;
    kent_build b = one_pipe();
    const int outlet = kent_build_fixed_level(&b, "S", 42.0);
    kent_build_state(&b, "normal");
    const int low = kent_build_state(&b, "low");
    kent_build_state_level(&b, low, 0, 51.0);
    const int old = kent_build_state(&b, "old");
    b.model->states[old].roughness_factor = 2.0;
    const int back = kent_build_state(&b, "back"); /* S stands above R */
    kent_build_state_level(&b, back, 0, 30.0);
    kent_build_state_level(&b, back, outlet, 39.0);
    solved s = solve(b);
    assert_close(s.of[0]->span_flow[0], flow_by_hand(18.0, 1.0), 1e-12);
    assert_close(s.of[low]->span_flow[0], flow_by_hand(9.0, 1.0), 1e-12);
    assert_close(s.of[old]->span_flow[0], flow_by_hand(18.0, 2.0), 1e-12);
    /* out of S, which has no loss of its own; R costs what flows into it nothing */
    const double v = sqrt(2.0 * G * 9.0 / (1.0 + 0.018 * 1500.0 / 0.5));
    assert_close(s.of[back]->span_flow[0], -v * PI / 4.0 * 0.25, 1e-12);
    for (int i = 0; i < STATES; i++) {
        assert_ptr_equal(s.of[i]->model, s.of[i]->view);
    }
    clear(&s);
}

/* In a long pipe friction rules: twice f, the flow falls to 1/sqrt 2 of itself. */
static void twice_the_friction_passes_the_root_of_a_half(void **state)
{
    (void)state;
    kent_build b = one_pipe();
    b.model->pipes[0].length = 1.5e6; /* m: the velocity head is 1/36 000 of the loss */
    kent_build_fixed_level(&b, "S", 42.0);
    kent_build_state(&b, "new");
    kent_build_state(&b, "old");
    b.model->states[1].roughness_factor = 2.0;
    solved s = solve(b);
    assert_close(s.of[1]->span_flow[0] / s.of[0]->span_flow[0], sqrt(0.5), 3e-5);
    clear(&s);
}

/* Q^1.852 / C^1.852: half of C with half of Q loses as much. */
static void the_coefficient_of_hazen_and_williams_is_divided(void **state)
{
    (void)state;
    kent_build b = one_pipe();
    b.model->pipes[0].friction = KENT_HAZEN_WILLIAMS;
    b.model->pipes[0].friction_coefficient = 140.0;
    kent_build_outflow(&b, "S", 0.2);
    kent_build_state(&b, "normal");
    kent_build_state(&b, "rough");
    b.model->states[1].roughness_factor = 2.0;
    const int quiet = kent_build_state(&b, "rough-and-quiet");
    b.model->states[quiet].roughness_factor = 2.0;
    b.model->states[quiet].outflow_factor = 0.5;
    solved s = solve(b);
    double loss[3];
    for (int i = 0; i < 3; i++) {
        const double *head = s.of[i]->node_head;
        loss[i] = head[0] - head[1];
    }
    assert_true(loss[0] > 1.0);
    assert_close(loss[1] / loss[0], pow(2.0, 1.852), 1e-12);
    assert_close(loss[2], loss[0], 1e-12);
    assert_close(s.of[2]->outflow[0], 0.1, 1e-14);
    clear(&s);
}

/* Nothing drawn at all, dependent on pressure or not: the water stands. */
static void an_outflow_times_nothing_draws_nothing(void **state)
{
    (void)state;
    for (int dependent = 0; dependent < 2; dependent++) {
        kent_build b = one_pipe();
        const int out = kent_build_outflow(&b, "S", 0.2);
        b.model->outflows[out].pressure_dependent = dependent;
        b.model->outflows[out].full_pressure = 2e5;
        kent_build_state(&b, "normal");
        const int night = kent_build_state(&b, "night");
        b.model->states[night].outflow_factor = 0.0;
        solved s = solve(b);
        assert_close(s.of[0]->span_flow[0], 0.2, 1e-12);
        assert_within(s.of[night]->span_flow[0], 0.0, 1e-12);
        assert_within(s.of[night]->node_head[1], 60.0, 1e-9);
        clear(&s);
    }
}

/* A valve that passes 0.3 m3/s in the first state keeps the capacity for it:
 * Q = E sqrt(H - discharge level). */
static void a_stated_flow_is_that_of_the_first_state(void **state)
{
    (void)state;
    kent_build b = one_pipe();
    const int v = kent_build_valve(&b, "V", "S", (double)NAN, 42.0);
    b.model->valves[v].flow = 0.3;
    kent_build_state(&b, "normal");
    const int low = kent_build_state(&b, "low");
    kent_build_state_level(&b, low, 0, 52.0);
    solved s = solve(b);
    assert_close(s.of[0]->valve_flow[0], 0.3, 1e-12);
    const double v0 = 0.3 / (PI / 4.0 * 0.25), lost = 1.5 + 0.018 * 3000.0;
    const double capacity = 0.3 / sqrt(18.0 - lost * v0 * v0 / (2.0 * G));
    assert_close(s.of[0]->valve_capacity[0], capacity, 1e-12);
    assert_true(s.of[low]->valve_capacity[0] == s.of[0]->valve_capacity[0]);
    /* 10 m in all: (lost / 2g A2 + 1/E2) Q2 */
    const double per_square =
        lost / (2.0 * G * pow(PI / 4.0 * 0.25, 2)) + 1.0 / (capacity * capacity);
    assert_close(s.of[low]->valve_flow[0], sqrt(10.0 / per_square), 1e-12);
    clear(&s);
}

/* Two units, one, none: 10 + 60 - 4000 (q/n)2 = 40 + r q2 (a parabola through two
 * points of the curve against a quadratic main). */
static void each_state_has_its_own_units_running(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "P", 0.0, 0.0, 5.0);
    kent_build_point(&b, "R", 2000.0, 0.0, 5.0);
    const int a = kent_build_pipe(&b, "A", "P R", 0.3, 1000.0);
    b.model->pipes[a].friction = KENT_DARCY_FIXED;
    b.model->pipes[a].friction_coefficient = 0.02;
    kent_build_fixed_level(&b, "R", 40.0);
    const int p = kent_build_pump(&b, "PS", "P", NULL, 60.0, 0.1, 20.0);
    kent_pump *pump = &b.model->pumps[p];
    pump->curve.count = 2;
    assert_null(kent_pump_curve_complete(&pump->curve, 1000.0, G));
    pump->suction_level = 10.0;
    pump->in_parallel = pump->running = 2;
    pump->check_valve = KENT_CHECK_IDEAL;
    kent_state_running running[2] = {{p, 1}, {p, 0}};
    kent_build_state(&b, "both");
    for (int i = 0; i < 2; i++) {
        const int k = kent_build_state(&b, i ? "none" : "one");
        b.model->states[k].running_first = (size_t)i;
        b.model->states[k].running_count = 1;
    }
    b.model->state_running = kent_alloc(2, sizeof running[0]);
    assert_non_null(b.model->state_running);
    memcpy(b.model->state_running, running, sizeof running);
    b.model->state_running_count = 2;
    solved s = solve(b);
    const double area = PI * 0.09 / 4.0;
    const double r = 0.02 * 2000.0 / 0.3 / (2.0 * G * area * area);
    assert_close(s.of[0]->device_flow[0], sqrt(30.0 / (r + 1000.0)), 1e-9);
    assert_close(s.of[1]->device_flow[0], sqrt(30.0 / (r + 4000.0)), 1e-9);
    assert_true(s.of[2]->device_flow[0] == 0.0);
    assert_int_equal(kent_steady_pump(s.of[1], 0).running, 1);
    assert_true(kent_steady_pump(s.of[2], 0).power == 0.0);
    clear(&s);
}

static void the_state_that_fails_is_named(void **state)
{
    (void)state;
    kent_build b = one_pipe();
    const int v = kent_build_valve(&b, "V", "S", (double)NAN, 42.0);
    b.model->valves[v].flow = 0.3;
    const int first = kent_build_state(&b, "dry");
    kent_build_state_level(&b, first, 0, 40.0); /* below where V discharges */
    kent_build_state(&b, "normal");
    kent_build_derive(&b);
    kent_steady *of[2] = {NULL};
    kent_error err = {0};
    assert_int_equal(kent_steady_solve_states(b.model, of, &err), KENT_E_INPUT);
    assert_int_equal(strncmp(err.what, "in state \"dry\": valve V cannot pass 0.3", 39),
                     0);
    assert_true(of[0] == NULL && of[1] == NULL);
    kent_build_clear(&b);
}

static int solve_once(void *context)
{
    const kent_model *m = context;
    kent_error err = {0};
    kent_steady **of = kent_alloc(m->state_count, sizeof(kent_steady *));
    const kent_status status =
        of ? kent_steady_solve_states(m, of, &err) : KENT_E_NOMEM;
    kent_allocations_grant(-1);
    if (status != KENT_OK) assert_int_equal(status, KENT_E_NOMEM);
    kent_steady_free_states(of, m->state_count);
    return status == KENT_OK ? 0 : -1;
}

static void any_allocation_may_fail(void **state)
{
    (void)state;
    kent_build b = one_pipe();
    kent_build_fixed_level(&b, "S", 42.0);
    kent_build_state(&b, "normal");
    kent_build_state_level(&b, kent_build_state(&b, "low"), 0, 51.0);
    kent_build_derive(&b);
    assert_true(kent_allocations_needed(solve_once, b.model) > 20);
    kent_steady_free_states(NULL, 2);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(each_state_flows_by_its_own_levels_and_friction),
        cmocka_unit_test(twice_the_friction_passes_the_root_of_a_half),
        cmocka_unit_test(the_coefficient_of_hazen_and_williams_is_divided),
        cmocka_unit_test(an_outflow_times_nothing_draws_nothing),
        cmocka_unit_test(a_stated_flow_is_that_of_the_first_state),
        cmocka_unit_test(each_state_has_its_own_units_running),
        cmocka_unit_test(the_state_that_fails_is_named),
        cmocka_unit_test(any_allocation_may_fail),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
