/* Every allocation of a derivation refused once: "out of memory", nothing half-made,
 * and (with the sanitizer) nothing lost. */
#include "kent_alloc_fail.h"
#include "kent_build.h"
#include "kent_check.h"

/* One derivation; it may fail for want of memory only. */
static int derive(void *context)
{
    kent_model *m = context;
    kent_complaints complaints = {0};
    const kent_status status = kent_model_derive(m, &complaints);

    kent_allocations_grant(-1);
    assert_int_equal(complaints.count, 0);
    if (status == KENT_OK) return 0;
    assert_int_equal(status, KENT_E_NOMEM);
    assert_int_equal(m->span_count, 0);
    assert_int_equal(m->fitting_count, 0);
    kent_notes_clear(&m->cautions);
    return -1;
}

static void each_refused_allocation_is_out_of_memory(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "P", 100.0, 30.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    kent_build_point(&b, "D", 100.0, 50.0, 0.0);
    kent_build_point(&b, "X", 7.0, 7.0, 7.0); /* cautioned */
    kent_build_point(&b, "Q", 50.0, 15.0, 0.0);
    kent_build_pipe(&b, "A", "R Q P E", 0.3, 1000.0);
    kent_build_pipe(&b, "C", "P D", 0.1, 1000.0);
    b.model->points[3].at.y = 30.4; /* an end close to its tee: one fitting */
    b.model->pipes[1].joint = KENT_FLANGED;
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_check_valve(&b, "NR", "Q", "P");
    kent_build_air_vessel(&b, "V", "D", 1.0, 0.5);

    /* More than ten: it does allocate, so that something was tested. */
    assert_true(kent_allocations_needed(derive, b.model) > 10);
    assert_true(kent_model_is_valid(b.model));
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(each_refused_allocation_is_out_of_memory),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
