/* Memory that runs out anywhere is an error and leaves nothing behind. */
#include "kent_hand.h"
#include "kent_alloc_fail.h"

typedef struct job {
    const kent_model *model;
    const kent_loads_result *loads;
} job;

static int size_once(void *context)
{
    const job *j = context;
    kent_restraints *r = NULL;
    kent_error err = {0};
    const kent_status status = kent_restraint_size(j->model, j->loads, &r, &err);

    if (status == KENT_OK) {
        kent_restraints_free(r);
        return 0;
    }
    assert_int_equal(status, KENT_E_NOMEM);
    assert_int_equal(err.status, KENT_E_NOMEM);
    assert_null(r);
    return -1;
}

static void any_allocation_may_fail_and_nothing_leaks(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6},
                                           {"shut", KENT_CASE_OCCASIONAL, 1.5, 1.1e6}};
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "B", 100.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 200.0, 30.0, 55.0);
    (void)kent_build_point(&b, "D", 300.0, 60.0, 50.0);
    (void)kent_build_pipe(&b, "P", "A B C D", 0.4, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_scenario(&b, "shut", 60.0);
    (void)kent_build_soil(&b, "till", 40e3, 19e3, 1.2); /* some held, some refused */
    b.model->ground.water_table = (double)INFINITY;
    kent_build_derive(&b);
    kent_loads_result loads = kent_hand_loads(b.model, cases, 2);
    job j = {b.model, &loads};

    assert_true(kent_allocations_needed(size_once, &j) > 10);
    kent_hand_clear(&loads);
    kent_build_clear(&b);
}

static void freeing_nothing_is_safe(void **state)
{
    (void)state;
    kent_restraints_free(NULL);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(any_allocation_may_fail_and_nothing_leaks),
        cmocka_unit_test(freeing_nothing_is_safe),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
