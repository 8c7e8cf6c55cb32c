/* Two methods on the same mains, and what is said of their difference. */
#include "kent_alloc_fail.h"
#include "kent_crosscheck.h"
#include "march.h"
#include "nets.h"

#include <math.h>
#include <string.h>

/* Highest and lowest head at the end of a span by the march. */
static void march_peaks(kent_build *b, int span, double *highest, double *lowest)
{
    const kent_watch end = {span, b->model->spans[span].length};
    const double duration = b->model->scenarios[0].duration;
    march m = {.build = b};
    kent_error err = {0};
    kent_trace trace = {0};
    assert_int_equal(kent_steady_solve(b->model, &m.steady, &err), KENT_OK);
    assert_int_equal(kent_grid_plan(b->model, duration, &m.grid, &err), KENT_OK);
    m.marcher = march_marcher(&m, 0, &end, 1, 1);
    *highest = -INFINITY;
    *lowest = INFINITY;
    do {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        *highest = fmax(*highest, trace.head[0]);
        *lowest = fmin(*lowest, trace.head[0]);
    } while (trace.time[0] < duration);
    march_clear(&m);
}

static kent_opinion opinion_of(const kent_build *b, kent_steady *s)
{
    const kent_march it = {0, 0};
    kent_opinion o = {0};
    kent_error err = {0};
    if (kent_crosscheck_run(b->model, &s, &it, 1, 1, &o, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    return o;
}

/* A reservoir, 1200 m of rough pipe, a valve that shuts in `ramp` s. */
static kent_build one_main(double ramp, double duration)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", 1200.0, 0.0, 0.0);
    const int p = kent_build_pipe(&b, "main", "R E", 0.5, 1000.0);
    b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
    b.model->pipes[p].friction_coefficient = 0.2e-3;
    kent_build_fixed_level(&b, "R", 80.0);
    const int v = kent_build_valve(&b, "V", "E", 0.04, 0.0);
    const int s = kent_build_scenario(&b, "shut", duration);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.0, ramp, 0.0);
    return b;
}

static void both_methods_agree_on_slow_closures(void **state)
{
    (void)state;
    for (int times = 1; times <= 4; times *= 2) {
        kent_build b = one_main(2.4 * times, 2.4 * times + 3.0);
        double highest = 0.0, lowest = 0.0;
        kent_steady *s = nets_steady(&b);
        kent_opinion o = opinion_of(&b, s);
        march_peaks(&b, 0, &highest, &lowest);
        const double swing = highest - lowest;
        print_message("ramp of %d x 2L/a: %.3f, %.3f m of %.1f m\n", times,
                      o.peaks[1].highest - highest, o.peaks[1].lowest - lowest, swing);
        assert_true(kent_opinion_is_asked(&o));
        assert_within(o.back_and_forth, 2.4, 1e-12);
        assert_within(o.peaks[1].highest, highest, KENT_CROSSCHECK_ASKED * swing);
        assert_within(o.peaks[1].lowest, lowest, KENT_CROSSCHECK_ASKED * swing);
        assert_true((o.rigid != NULL) == (times == 4));
        kent_opinion_clear(&o);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

static void a_quick_closure_is_not_asked_to_agree(void **state)
{
    (void)state;
    kent_build b = one_main(1.0, 3.0);
    kent_steady *s = nets_steady(&b);
    kent_opinion o = opinion_of(&b, s);
    assert_false(kent_opinion_is_asked(&o));
    assert_null(o.rigid);
    kent_opinion_clear(&o);
    kent_steady_free(s);
    kent_build_clear(&b);
}

static void both_methods_agree_in_a_loop(void **state)
{
    (void)state;
    kent_build b = nets_loop();
    double highest = 0.0, lowest = 0.0;
    kent_steady *s = nets_steady(&b);
    kent_opinion o = opinion_of(&b, s);
    march_peaks(&b, kent_build_span_of(&b, "end"), &highest, &lowest);
    const double swing = highest - lowest;
    const int e = kent_model_point_index(b.model, "E");
    assert_within(o.peaks[e].highest, highest, 0.02 * swing);
    assert_within(o.peaks[e].lowest, lowest, 0.02 * swing);
    kent_opinion_clear(&o);
    kent_steady_free(s);
    kent_build_clear(&b);
}

static void what_is_left_out_is_said(void **state)
{
    (void)state;
    kent_build b = one_main(1.0, 3.0);
    b.model->solver.column_separation = KENT_SEPARATION_GAS;
    b.model->solver.friction = KENT_SURGE_UNSTEADY;
    kent_steady *s = nets_steady(&b);
    kent_opinion o = opinion_of(&b, s);
    assert_int_equal(o.left_out.count, 2);
    assert_non_null(strstr(o.left_out.text[0], "Column separation"));
    assert_non_null(strstr(o.left_out.text[1], "Unsteady friction"));
    assert_true(o.report.below_vapour ==
                (strstr(o.left_out.text[0], "falls below") != NULL));
    kent_opinion_clear(&o);
    b.model->points[1].at.z = 100.0;
    o = opinion_of(&b, s);
    assert_true(o.report.below_vapour);
    assert_non_null(strstr(o.left_out.text[0], "falls below"));
    kent_opinion_clear(&o);
    b.model->solver.column_separation = KENT_SEPARATION_NONE;
    o = opinion_of(&b, s);
    assert_true(o.report.below_vapour);
    assert_non_null(strstr(o.left_out.text[0], "neither is right"));
    kent_opinion_clear(&o);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* A level that goes nowhere has no heads; the scenario beside it goes on. */
static void where_one_stops_the_others_go_on(void **state)
{
    (void)state;
    kent_build b = one_main(3.0, 4.0);
    const int again = kent_build_scenario(&b, "nowhere", 4.0);
    const int e = kent_build_ramp(&b, again, KENT_EVENT_FIXED_LEVEL, 0, 1.0, 1.0, 0.0);
    kent_steady *s = nets_steady(&b);
    b.model->events[e].to = NAN;
    const kent_march marches[] = {{again, 0}, {0, 0}};
    kent_opinion o[2] = {{0}, {0}};
    kent_error err = {0};
    assert_int_equal(kent_crosscheck_run(b.model, &s, marches, 2, 2, o, &err), KENT_OK);
    assert_non_null(strstr(o[0].stopped.what, "the second method stopped at 1 s"));
    assert_string_equal(o[1].stopped.what, "");
    assert_true(o[1].peaks[1].highest > 100.0);
    kent_opinion_clear(&o[0]);
    kent_opinion_clear(&o[1]);
    kent_steady_free(s);
    kent_build_clear(&b);
}

typedef struct task {
    const kent_build *build;
    kent_steady *steady;
} task;

static int give_opinion(void *context)
{
    const task *t = context;
    const kent_march it = {0, 0};
    kent_opinion o = {0};
    kent_error err = {0};
    const kent_status status =
        kent_crosscheck_run(t->build->model, &t->steady, &it, 1, 1, &o, &err);
    if (status && status != KENT_E_NOMEM) fail_msg("%s", err.what);
    kent_opinion_clear(&o);
    return status ? -1 : 0;
}

/* Ours, through calloc; SUNDIALS' own cannot be refused here. */
static void every_refused_allocation_is_told(void **state)
{
    (void)state;
    kent_build b = one_main(16.0, 0.02);
    b.model->solver.column_separation = KENT_SEPARATION_GAS;
    task t = {&b, nets_steady(&b)};
    assert_true(kent_allocations_needed(give_opinion, &t) > 30);
    kent_steady_free(t.steady);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(both_methods_agree_on_slow_closures),
        cmocka_unit_test(a_quick_closure_is_not_asked_to_agree),
        cmocka_unit_test(both_methods_agree_in_a_loop),
        cmocka_unit_test(what_is_left_out_is_said),
        cmocka_unit_test(where_one_stops_the_others_go_on),
        cmocka_unit_test(every_refused_allocation_is_told),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
