/* Runs above ground: what the water does to a straight run as a whole. */
#include "kent_check.h"
#include "kent_net.h"

#include <math.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;
static const double WAVE = 1000.0, BORE = 0.5, GRAVITY = 9.80665, RHO = 1000.0;

/* R - B1 - B2 - V, two right angles and a valve that discharges, shut within `ramp` s
 * from 1 s on; the run between the bends is 100 m long and falls by `fall`. */
static kent_build two_bends(double ramp, double fall)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, fall);
    (void)kent_build_point(&b, "B1", 400.0, 0.0, fall);
    (void)kent_build_point(&b, "B2", 400.0, sqrt(1e4 - fall * fall), 0.0);
    (void)kent_build_point(&b, "V", 800.0, sqrt(1e4 - fall * fall), 0.0);
    const int p = kent_build_pipe(&b, "A", "R B1 B2 V", BORE, WAVE);
    b.model->pipes[p].above_ground = true;
    b.model->pipes[p].joint = KENT_FLANGED;
    b.model->solver.time_step = 0.01;
    (void)kent_build_fixed_level(&b, "R", 100.0);
    const int v = kent_build_valve(&b, "VE", "V", 0.01, 0.0);
    const int s = kent_build_scenario(&b, "shut", 2.0);
    (void)kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 1.0, ramp, 0.0);
    return b;
}

/* Marches scenario 0 through the recorder. Returns the step, s. */
static double march_whole(kent_net *n)
{
    kent_error err = {0};
    kent_grid *grid = NULL;
    kent_marcher *k = NULL;
    kent_trace trace = {0};

    if (kent_grid_plan(n->model, 2.0, &grid, &err)) fail_msg("%s", err.what);
    if (kent_marcher_new(n->model, n->steady, grid, 0, n->watches, n->watch_count, 64,
                         &k, &err)) {
        fail_msg("%s", err.what);
    }
    const double step = grid->step;
    kent_recorder_start(n->recorder, 0, step);
    for (double t = 0.0; t < 2.0;) {
        const size_t got = kent_marcher_advance(k, 64, &trace, &err);
        assert_true(got > 0);
        kent_recorder_take(n->recorder, 0, &trace);
        t = trace.time[got - 1];
    }
    kent_marcher_free(k);
    kent_grid_free(grid);
    kent_net_finish(n);
    return step;
}

/* Joukowsky (1898): a front of a V passing a run of length L loads it with rho a V A
 * for L/a, for its head stands on one end alone. In the steady flow before it: nothing.
 */
static void a_front_loads_a_run_while_it_passes(void **state)
{
    (void)state;
    kent_net n = kent_net_of(two_bends(1e-6, 0.0));
    const double area = 0.25 * PI * BORE * BORE;
    const double speed = n.steady->span_flow[0] / area;
    const double step = march_whole(&n);
    const kent_run *run = &n.loads->runs[1];
    const kent_run_march *march = &run->marches[0];

    assert_int_equal(n.loads->run_count, 3);
    assert_close(run->length, 100.0, 1e-12);
    assert_true(speed > 0.1);
    assert_true(march->set);
    /* rho V^2 A of the stream that is stopped is of the order V/a of it */
    assert_close(march->highest.force, RHO * WAVE * speed * area, 1.5 * speed / WAVE);
    assert_true(march->highest.time > 1.4 && march->highest.time < 1.5 + 2.0 * step);
    for (size_t i = 0; i < march->history_count; i++) {
        const kent_run_moment at = march->history[i];
        const bool passes = at.time > 1.4 - step && at.time < 1.5 + 2.0 * step;
        if (at.time < 1.4 - step) assert_within(at.force, 0.0, 1e-6);
        if (passes || at.time < 1.5) continue;
        /* until it comes back from the tank */
        if (at.time < 2.3 - step) assert_within(at.force, 0.0, 2.0);
    }
    assert_true(march->history_count > 100);
    kent_net_clear(&n);
}

static void what_comes_back_pulls_the_other_way(void **state)
{
    (void)state;
    kent_build b = two_bends(1e-6, 0.0);
    b.model->scenarios[0].duration = 2.5;
    kent_net n = kent_net_of(b);
    (void)march_whole(&n); /* until 2 s: the front is back at the first run's end */
    const kent_run_march *march = &n.loads->runs[0].marches[0];
    /* from 1.5 s it stands on this run's end, from 1.9 s at rest under its head */
    const kent_run_worst most = kent_run_most(n.model, &n.loads->runs[0], true);
    assert_int_equal(most.march, 0);
    assert_close(most.force, march->highest.force, 1e-15);
    assert_true(march->highest.force > 0.0);
    const kent_run_worst least = kent_run_most(n.model, &n.loads->runs[0], false);
    assert_true(least.force <= 0.0);
    kent_net_clear(&n);
}

/* Newton's second law for the water of the run, on the grid's own points: the force is
 * what its momentum loses. Exact, for the method of characteristics without friction
 * moves both by the same sums; its equations leave out the stream's own inertia. */
static void the_force_is_what_the_momentum_of_the_run_loses(void **state)
{
    (void)state;
    kent_build b = two_bends(0.3, 0.0);
    b.model->pipes[0].above_ground = true;
    kent_net n = kent_net_of(b);
    kent_error err = {0};
    kent_grid *grid = NULL;
    kent_marcher *k = NULL;
    if (kent_grid_plan(n.model, 2.0, &grid, &err)) fail_msg("%s", err.what);
    if (kent_marcher_new(n.model, n.steady, grid, 0, NULL, 0, 1, &k, &err)) {
        fail_msg("%s", err.what);
    }
    const size_t nodes = (size_t)grid->reaches[0] + 1;
    const double reach = n.model->spans[0].length / grid->reaches[0];
    const size_t first = (size_t)lround(400.0 / reach),
                 last = (size_t)lround(500.0 / reach);
    const double area = n.model->spans[0].area;
    double *head = calloc(nodes, sizeof *head), *flow = calloc(nodes, sizeof *flow);
    double before = NAN, force_before = NAN, largest = 0.0;
    size_t checked = 0;
    assert_non_null(head);
    assert_non_null(flow);
    assert_within((double)first * reach, 400.0, 1e-9);
    assert_within((double)last * reach, 500.0, 1e-9);
    for (double t = 0.0; t < 2.0;) {
        kent_trace trace = {0};
        assert_int_equal(kent_marcher_advance(k, 1, &trace, &err), 1);
        kent_marcher_profile(k, 0, head, flow);
        double momentum = 0.0;
        for (size_t i = first; i < last; i++) {
            momentum += 0.5 * RHO * (flow[i] + flow[i + 1]) * reach;
        }
        const kent_run_state at = {.head = {head[first], head[last]},
                                   .flow = {flow[first], flow[last]}};
        const double force = kent_run_force(area, RHO, GRAVITY, &at);
        if (!isnan(before)) {
            assert_within(momentum - before, -0.5 * grid->step * (force + force_before),
                          1e-6);
            largest = fmax(largest, fabs(force));
            checked++;
        }
        before = momentum;
        force_before = force;
        t = trace.time[0];
    }
    assert_true(checked > 100 && largest > 1e4);
    free(head);
    free(flow);
    kent_marcher_free(k);
    kent_grid_free(grid);
    kent_net_clear(&n);
}

/* Head lost to the wall pulls the pipe along with the water, and the lower pressure at
 * its end pulls it back by as much. */
static void steady_flow_with_friction_leaves_nothing(void **state)
{
    (void)state;
    kent_build b = two_bends(0.3, 0.0);
    b.model->pipes[0].friction = KENT_DARCY_FIXED;
    b.model->pipes[0].friction_coefficient = 0.03;
    b.model->pipes[0].loss = 4.0;
    kent_net n = kent_net_of(b);
    (void)march_whole(&n);
    const kent_run_march *march = &n.loads->runs[1].marches[0];
    assert_within(march->history[0].force, 0.0, 1e-6);
    assert_true(march->history[0].time < 0.5);
    assert_true(march->highest.force > 1000.0);
    kent_net_clear(&n);
}

/* Still water leans down its run with its weight's share, rho g A L sin. */
static void weight_is_told_apart(void **state)
{
    (void)state;
    kent_build b = two_bends(0.3, 60.0);
    b.model->pipes[0].unit_mass = 120.0;
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    const kent_run *run = &n.loads->runs[1];
    assert_close(run->rise, -60.0, 1e-12);
    assert_close(run->axis.z, -0.6, 1e-12);
    assert_close(run->water_weight, RHO * GRAVITY * run->area * 60.0, 1e-12);
    assert_close(run->pipe_weight, 120.0 * GRAVITY * 60.0, 1e-12);
    assert_false(run->marches[0].set);
    assert_int_equal(kent_run_most(n.model, run, true).march, -1);
    kent_net_clear(&n);
}

/* A tee of a device beside the main, or a bolted branch, does not break a run; buried
 * pipe has none. */
static void only_turns_and_ends_break_a_run(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    (void)kent_build_point(&b, "M", 100.0, 0.0, 0.0);
    (void)kent_build_point(&b, "B", 200.0, 0.0, 0.0);
    (void)kent_build_point(&b, "G", 200.0, 50.0, 0.0);
    (void)kent_build_point(&b, "E", 200.0, 300.0, 0.0);
    const int p = kent_build_pipe(&b, "A", "R M B G", 0.5, WAVE);
    b.model->pipes[p].above_ground = true;
    (void)kent_build_pipe(&b, "buried", "G E", 0.5, WAVE);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    const int note = kent_build_note(&b, "M");
    b.model->notes[note].branch.end = KENT_BRANCH_BLANK;
    b.model->notes[note].branch.joint = KENT_FLANGED;
    b.model->notes[note].branch.direction = (kent_vec3){0.0, 0.0, 1.0};
    b.model->notes[note].branch.outside_diameter = 0.1;
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    assert_int_equal(n.loads->run_count, 2);
    assert_string_equal(n.model->points[n.loads->runs[0].to].id, "B");
    assert_string_equal(n.model->points[n.loads->runs[1].from].id, "B");
    assert_string_equal(n.model->points[n.loads->runs[1].to].id, "G");
    assert_true(n.loads->runs[1].slips);
    kent_net_clear(&n);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_front_loads_a_run_while_it_passes),
        cmocka_unit_test(what_comes_back_pulls_the_other_way),
        cmocka_unit_test(the_force_is_what_the_momentum_of_the_run_loses),
        cmocka_unit_test(steady_flow_with_friction_leaves_nothing),
        cmocka_unit_test(weight_is_told_apart),
        cmocka_unit_test(only_turns_and_ends_break_a_run),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
