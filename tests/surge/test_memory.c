/* Every allocation refused once; none while marching. Linked with --wrap=kent_alloc. */
#include "march.h"

#include <math.h>

void *__real_kent_alloc(size_t count, size_t size); /* NOLINT: the linker's name */
void *__wrap_kent_alloc(size_t count, size_t size); /* NOLINT */

static long left = -1; /* allocations still granted; -1: all */

void *__wrap_kent_alloc(size_t count, size_t size) /* NOLINT */
{
    if (left == 0) return NULL;
    if (left > 0) left--;
    return __real_kent_alloc(count, size);
}

static const kent_watch END = {0, 1000.0};

static kent_build small_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", 1000.0, 0.0, 0.0);
    kent_build_pipe(&b, "main", "R E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", 60.0);
    const int v = kent_build_valve(&b, "V", "E", 0.05, 0.0);
    const int s = kent_build_scenario(&b, "shut", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 1.0, 3.0, 0.0);
    kent_build_air_vessel(&b, "VES", "E", 2.0, 1.0);
    kent_build_surge_tank(&b, "ST", "E", 3.0);
    kent_model *m = b.model; /* all that a march may keep */
    m->pipes[0].friction = KENT_COLEBROOK_WHITE;
    m->pipes[0].friction_coefficient = 1e-4;
    m->solver.friction = KENT_SURGE_UNSTEADY;
    m->solver.creep = true;
    m->creep = kent_alloc(1, sizeof *m->creep);
    assert_non_null(m->creep);
    m->creep[0] = (kent_creep){0.5, 1e-11};
    m->creep_count = m->pipes[0].creep_count = 1;
    return b;
}

static void every_refused_allocation_is_reported(void **state)
{
    (void)state;
    kent_build b = small_main();
    march m = march_new(&b, 60.0, 0, &END, 1, 16);
    kent_grid *g = NULL, *fine = NULL;
    kent_marcher *k = NULL;
    long refused = 0;
    for (long granted = 0; !k; granted++) {
        kent_error err = {0};
        left = granted;
        kent_status status = kent_grid_plan(b.model, 60.0, &g, &err);
        if (status == KENT_OK) status = kent_grid_refine(g, 1, 2, &fine, &err);
        if (status == KENT_OK) {
            status =
                kent_marcher_new(b.model, m.steady, fine, 0, &END, 1, 16, &k, &err);
        }
        left = -1;
        if (status != KENT_OK) {
            assert_int_equal(status, KENT_E_NOMEM);
            assert_int_equal(err.status, KENT_E_NOMEM);
            refused++;
        }
        kent_grid_free(g);
        kent_grid_free(fine);
        g = fine = NULL;
    }
    assert_true(refused > 20);
    kent_marcher_free(k);
    march_clear(&m);
    kent_build_clear(&b);
}

static void marching_allocates_nothing(void **state)
{
    (void)state;
    kent_build b = small_main();
    march m = march_new(&b, 60.0, 0, &END, 1, 16);
    kent_trace trace;
    kent_error err = {0};
    left = 0;
    for (int i = 0; i < 100; i++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 16, &trace, &err), 16);
    }
    left = -1;
    assert_true(isfinite(trace.head[15]));
    march_clear(&m);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_refused_allocation_is_reported),
        cmocka_unit_test(marching_allocates_nothing),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
