#include "kent_grid.h"

#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <string.h>
#include <stdio.h>

/* A line of pipes of the given lengths (m), 1000 m/s each. */
static kent_build line_of(const double *length, int count)
{
    kent_build b = kent_build_new();
    char id[16], route[32];
    for (int i = 0; i <= count; i++) {
        (void)snprintf(id, sizeof id, "P%d", i);
        kent_build_point(&b, id, (double)NAN, (double)NAN, 0.0);
    }
    for (int i = 0; i < count; i++) {
        (void)snprintf(id, sizeof id, "%d", i);
        (void)snprintf(route, sizeof route, "P%d P%d", i, i + 1);
        const int p = kent_build_pipe(&b, id, route, 0.3 + 0.05 * i, 1000.0);
        b.model->pipes[p].length = length[i];
    }
    kent_build_fixed_level(&b, "P0", 50.0);
    b.model->solver.wave_speed_tolerance = 0.02;
    b.model->solver.min_reaches = 20;
    b.model->solver.time_step = (double)NAN;
    kent_build_derive(&b);
    return b;
}

static kent_grid *plan(const kent_build *b, double duration)
{
    kent_grid *g = NULL;
    kent_error err = {0};
    if (kent_grid_plan(b->model, duration, &g, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    size_t nodes = 0, misses = 0;
    for (size_t i = 0; i < b->model->span_count; i++) {
        const kent_span *s = &b->model->spans[i];
        const double moved = fabs(g->wave_speed_used[i] / s->wave_speed - 1.0);
        assert_true(g->reaches[i] >= 1); /* Courant number one, whole reaches */
        assert_close(g->wave_speed_used[i] * g->step * g->reaches[i], s->length, 1e-13);
        assert_int_equal(g->misses[i],
                         moved > b->model->solver.wave_speed_tolerance + 1e-8);
        nodes += (size_t)g->reaches[i] + 1;
        misses += g->misses[i] ? 1 : 0;
    }
    assert_int_equal(g->node_total, nodes);
    assert_int_equal(g->miss_count, misses);
    return g;
}

static void one_pipe_takes_just_its_reaches(void **state)
{
    (void)state;
    const double length[] = {2000.0};
    kent_build b = line_of(length, 1);
    kent_grid *g = plan(&b, 60.0);
    assert_int_equal(g->reaches[0], 20);
    assert_close(g->step, 0.1, 1e-12);
    assert_close(g->wave_speed_used[0], 1000.0, 1e-12);
    kent_grid_free(g);
    kent_build_clear(&b);
}

/* Against a search by brute force: no longer step suits. */
static void the_step_is_the_longest_that_meets_the_tolerance(void **state)
{
    (void)state;
    const double length[] = {613.7, 287.3, 1511.9, 144.4};
    kent_build b = line_of(length, 4);
    b.model->solver.wave_speed_tolerance = 0.004;
    kent_grid *g = plan(&b, 60.0);
    assert_int_equal(g->miss_count, 0);
    const double first = 144.4 / 1000.0 / 20.0;
    assert_true(g->step < first * (1.0 - 1e-6)); /* had to be searched for */
    double step = first;
    while (step > g->step * (1.0 + 1e-6)) {
        bool suits = true;
        for (int i = 0; i < 4; i++) {
            const double reaches = length[i] / 1000.0 / step;
            const double up = reaches / ceil(reaches) - 1.0;
            const double down = reaches / floor(reaches) - 1.0;
            suits = suits && (fabs(up) <= 0.004 || fabs(down) <= 0.004);
        }
        assert_false(suits);
        step *= 1.0 - 1e-6;
    }
    kent_grid_free(g);
    kent_build_clear(&b);
}

/* 7.23: by the square root of its travel time only, not in proportion to it. */
static void a_stub_is_lumped_as_far_as_its_delay_allows(void **state)
{
    (void)state;
    const double length[] = {2000.0, 5.0, 1000.0};
    kent_build b = line_of(length, 3);
    kent_grid *g = plan(&b, 60.0);
    const double travel = 0.005, longest = 2.0; /* s */
    assert_int_equal(g->reaches[1], 1);
    assert_true(g->misses[1]);
    assert_int_equal(g->miss_count, 1);
    const double delay = g->step * g->step / travel; /* s */
    assert_true(delay <= longest / 50.0 && delay > 0.9 * longest / 50.0);
    kent_grid_free(g);
    kent_build_clear(&b);
}

/* 333.33 and 777.7 m have no common reach: nothing would be gained by the finest grid.
 */
static void a_tolerance_nobody_can_meet_does_not_cost_the_whole_budget(void **state)
{
    (void)state;
    const double length[] = {1000.0, 333.33, 777.7};
    kent_build b = line_of(length, 3);
    b.model->solver.wave_speed_tolerance = 0.0;
    kent_grid *g = plan(&b, 60.0);
    assert_close(g->step, 333.33 / 1000.0 / 20.0, 1e-9);
    assert_int_equal(g->miss_count, 2);
    kent_grid_free(g);
    kent_build_clear(&b);
}

static void the_budget_comes_before_tolerance_and_reaches(void **state)
{
    (void)state;
    const double length[] = {2000.0, 60.0};
    kent_build b = line_of(length, 2);
    kent_grid *g = plan(&b, 60.0), *slow = plan(&b, 3e6);
    assert_true(slow->step > 2.0 * g->step);
    const double updates = (double)slow->node_total * 3e6 / slow->step;
    assert_true(updates <= 5e9 && updates > 2.5e9);
    kent_grid_free(slow);
    kent_grid_free(g);
    kent_build_clear(&b);
}

static void a_given_step_is_honoured_or_refused(void **state)
{
    (void)state;
    const double length[] = {2000.0, 1000.0};
    kent_build b = line_of(length, 2);
    static const struct {
        double step;
        const char *what;
    } bad[] = {
        {5.0, "time_step 5 s is longer than a wave takes through the longest span; 2 s "
              "or shorter, or leave it out"},
        {1e-6, "time_step 1e-06 s takes more than 5e+09 node updates; 0.00019 s or "
               "longer, or leave it out"},
        {-1.0, "time_step -1 s is not a positive time"},
    };
    b.model->solver.time_step = 0.03;
    kent_grid *g = plan(&b, 60.0);
    assert_true(g->step == 0.03);
    assert_int_equal(g->reaches[0], 67);
    assert_int_equal(g->reaches[1], 33);
    kent_grid_free(g);
    for (int i = 0; i < 3; i++) {
        kent_error err = {0};
        b.model->solver.time_step = bad[i].step;
        assert_int_equal(kent_grid_plan(b.model, 60.0, &g, &err), KENT_E_INPUT);
        assert_string_equal(err.what, bad[i].what);
    }
    kent_build_clear(&b);
}

static void refining_keeps_the_wave_speeds(void **state)
{
    (void)state;
    const double length[] = {613.7, 287.3, 4.0};
    kent_build b = line_of(length, 3);
    kent_grid *g = plan(&b, 60.0), *fine = NULL;
    kent_error err = {0};
    assert_int_equal(kent_grid_refine(g, 3, 2, &fine, &err), KENT_OK);
    assert_true(fine->step == 0.5 * g->step);
    assert_int_equal(fine->node_total, 2 * g->node_total - 3);
    for (int i = 0; i < 3; i++) {
        assert_int_equal(fine->reaches[i], 2 * g->reaches[i]);
        assert_true(fine->wave_speed_used[i] == g->wave_speed_used[i]);
        assert_true(fine->misses[i] == g->misses[i]);
    }
    assert_int_equal(kent_grid_refine(g, 3, 0, &fine, &err), KENT_E_INPUT);
    assert_non_null(strstr(err.what, "cannot be cut in 0 parts each"));
    kent_grid_free(fine);
    kent_grid_free(g);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(one_pipe_takes_just_its_reaches),
        cmocka_unit_test(the_step_is_the_longest_that_meets_the_tolerance),
        cmocka_unit_test(a_stub_is_lumped_as_far_as_its_delay_allows),
        cmocka_unit_test(a_tolerance_nobody_can_meet_does_not_cost_the_whole_budget),
        cmocka_unit_test(the_budget_comes_before_tolerance_and_reaches),
        cmocka_unit_test(a_given_step_is_honoured_or_refused),
        cmocka_unit_test(refining_keeps_the_wave_speeds),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
