/* Every allocation of a derivation refused once: "out of memory", nothing half-made,
 * and (with the sanitizer) nothing lost. */
#include "kent_build.h"
#include "kent_check.h"

void *__real_calloc(size_t count, size_t size); /* NOLINT: the linker wants this name */
void *__wrap_calloc(size_t count, size_t size); /* NOLINT */

static long granted_left = -1; /* allocations still granted; -1: all */

void *__wrap_calloc(size_t count, size_t size) /* NOLINT */
{
    if (granted_left == 0) return NULL;
    if (granted_left > 0) granted_left--;
    return __real_calloc(count, size);
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
    kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    kent_build_pipe(&b, "C", "P D", 0.1, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);

    kent_status status = KENT_E_NOMEM;
    long granted = 0;
    for (; status == KENT_E_NOMEM && granted < 1000; granted++) {
        kent_complaints complaints = {0};
        granted_left = granted;
        status = kent_model_derive(b.model, &complaints);
        granted_left = -1;
        assert_int_equal(complaints.count, 0);
        if (status == KENT_E_NOMEM) {
            assert_int_equal(b.model->span_count, 0);
            kent_notes_clear(&b.model->cautions);
        }
    }
    assert_int_equal(status, KENT_OK);
    assert_true(granted > 10); /* it does allocate: the loop has tested something */
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
