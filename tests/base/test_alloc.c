#include "kent_alloc.h"
#include "kent_alloc_fail.h"
#include "kent_check.h"

#include <stdlib.h>
#include <string.h>

static void memory_starts_as_zero(void **state)
{
    (void)state;
    unsigned char *bytes = kent_alloc(1000, 1);
    assert_non_null(bytes);
    for (size_t i = 0; i < 1000; i++) {
        assert_int_equal(bytes[i], 0);
    }
    free(bytes);
}

static void nothing_asked_for_still_gives_a_pointer(void **state)
{
    (void)state;
    void *p = kent_alloc(0, 16);
    assert_non_null(p);
    free(p);
}

static void a_size_that_overflows_is_refused(void **state)
{
    (void)state;
    assert_null(kent_alloc(SIZE_MAX / 2, 3));
}

static void growing_keeps_what_was_there_and_zeroes_the_rest(void **state)
{
    (void)state;
    void *array = NULL;
    size_t capacity = 0;
    assert_int_equal(kent_grow(&array, &capacity, 3, sizeof(int)), 0);
    assert_true(capacity >= 3);
    for (size_t i = 0; i < capacity; i++) {
        ((int *)array)[i] = (int)i + 1;
    }
    const size_t before = capacity;
    assert_int_equal(kent_grow(&array, &capacity, 5 * before, sizeof(int)), 0);
    assert_true(capacity >= 5 * before);
    for (size_t i = 0; i < capacity; i++) {
        assert_int_equal(((int *)array)[i], i < before ? (int)i + 1 : 0);
    }
    free(array);
}

static void growing_one_by_one_doubles(void **state)
{
    (void)state;
    void *array = NULL;
    size_t capacity = 0, moves = 0;
    for (size_t need = 1; need <= 100000; need++) {
        const size_t before = capacity;
        assert_int_equal(kent_grow(&array, &capacity, need, 1), 0);
        moves += capacity != before;
    }
    assert_true(moves < 20);
    free(array);
}

static void a_failed_growth_changes_nothing(void **state)
{
    (void)state;
    void *array = NULL;
    size_t capacity = 0;
    assert_int_equal(kent_grow(&array, &capacity, 4, 8), 0);
    void *const array_before = array;
    const size_t capacity_before = capacity;

    assert_int_equal(kent_grow(&array, &capacity, SIZE_MAX / 4, 8), -1);
    assert_ptr_equal(array, array_before);
    assert_int_equal(capacity, capacity_before);

    kent_allocations_grant(0);
    const int refused = kent_grow(&array, &capacity, 1000, 8);
    kent_allocations_grant(-1);
    assert_int_equal(refused, -1);
    assert_ptr_equal(array, array_before);
    assert_int_equal(capacity, capacity_before);
    free(array);
}

static void a_copy_is_equal_and_ones_own(void **state)
{
    (void)state;
    const char *text = "Tarnhollow";
    char *copy = kent_copy_text(text);
    assert_non_null(copy);
    assert_ptr_not_equal(copy, text);
    assert_string_equal(copy, text);
    free(copy);

    kent_allocations_grant(0);
    copy = kent_copy_text(text);
    kent_allocations_grant(-1);
    assert_null(copy);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(memory_starts_as_zero),
        cmocka_unit_test(nothing_asked_for_still_gives_a_pointer),
        cmocka_unit_test(a_size_that_overflows_is_refused),
        cmocka_unit_test(growing_keeps_what_was_there_and_zeroes_the_rest),
        cmocka_unit_test(growing_one_by_one_doubles),
        cmocka_unit_test(a_failed_growth_changes_nothing),
        cmocka_unit_test(a_copy_is_equal_and_ones_own),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
