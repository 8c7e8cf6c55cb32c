/* A looped network far larger than any other test's: SIDE x SIDE junctions. */
#include "kent_build.h"
#include "kent_check.h"
#include "kent_marcher.h"

#include <stdio.h>

enum { SIDE = 120, STEPS = 400 };

static void pipe_between(kent_build *b, int row, int column, int down, int right)
{
    char id[KENT_ID], route[2 * KENT_ID];
    (void)snprintf(id, sizeof id, "%d-%d-%d", row, column, down);
    (void)snprintf(route, sizeof route, "%d_%d %d_%d", row, column, row + down,
                   column + right);
    const int pipe = kent_build_pipe(b, id, route, 0.3, 1000.0);
    b->model->pipes[pipe].friction = KENT_COLEBROOK_WHITE;
    b->model->pipes[pipe].friction_coefficient = 0.0003; /* m */
}

/* 100 m blocks, a level at one corner, 60 L/s drawn at the other. */
static kent_build street_grid(void)
{
    char id[KENT_ID];
    kent_build b = kent_build_new();
    for (int i = 0; i < SIDE; i++) {
        for (int j = 0; j < SIDE; j++) {
            (void)snprintf(id, sizeof id, "%d_%d", i, j);
            (void)kent_build_point(&b, id, 100.0 * j, 100.0 * i, 10.0);
        }
    }
    for (int i = 0; i < SIDE; i++) {
        for (int j = 0; j < SIDE; j++) {
            if (i + 1 < SIDE) pipe_between(&b, i, j, 1, 0);
            if (j + 1 < SIDE) pipe_between(&b, i, j, 0, 1);
        }
    }
    (void)kent_build_fixed_level(&b, "0_0", 90.0);
    (void)snprintf(id, sizeof id, "%d_%d", SIDE - 1, SIDE - 1);
    (void)kent_build_outflow(&b, id, 0.060);
    kent_build_derive(&b);
    return b;
}

static void a_network_of_thousands_of_loops_is_solved_and_stands_still(void **state)
{
    (void)state;
    kent_error err = {0};
    kent_build b = street_grid();
    kent_steady *s = NULL;
    kent_grid *g = NULL;
    kent_marcher *k = NULL;
    kent_trace trace;
    assert_int_equal(kent_steady_solve(b.model, &s, &err), KENT_OK);
    assert_true(s->report.worst_imbalance < 1e-12);
    /* by symmetry the two pipes out of the source carry half each */
    const int first = kent_build_span_of(&b, "0-0-1");
    const int second = kent_build_span_of(&b, "0-0-0");
    assert_close(s->span_flow[first], 0.030, 1e-9);
    assert_close(s->span_flow[second], 0.030, 1e-9);

    const kent_watch far = {(int)b.model->span_count - 1, 0.0};
    assert_int_equal(kent_grid_plan(b.model, 10.0, &g, &err), KENT_OK);
    assert_int_equal(kent_marcher_new(b.model, s, g, -1, &far, 1, STEPS, &k, &err),
                     KENT_OK);
    assert_int_equal(kent_marcher_advance(k, STEPS, &trace, &err), STEPS);
    for (size_t i = 0; i < STEPS; i++) {
        assert_within(trace.head[i], trace.head[0], 1e-9);
    }
    kent_marcher_free(k);
    kent_grid_free(g);
    kent_steady_free(s);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_network_of_thousands_of_loops_is_solved_and_stands_still),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
