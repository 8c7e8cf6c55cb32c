#include "kent_directory.h"
#include "kent_check.h"

static kent_directory three(void)
{
    const kent_place nowhere = {-1, 0};
    kent_directory d = {0};
    assert_int_equal(kent_directory_add(&d, "PI2", 0, nowhere), 0);
    assert_int_equal(kent_directory_add(&d, "END", 1, nowhere), 0);
    assert_int_equal(kent_directory_add(&d, "PI1", 2, nowhere), 0);
    kent_directory_sort(&d);
    return d;
}

static void an_id_is_found_with_the_index_it_was_added_with(void **state)
{
    (void)state;
    kent_directory d = three();
    assert_int_equal(kent_directory_find(&d, "PI2"), 0);
    assert_int_equal(kent_directory_find(&d, "END"), 1);
    assert_int_equal(kent_directory_find(&d, "PI1"), 2);
    assert_int_equal(kent_directory_find(&d, "PI3"), -1);
    kent_directory_clear(&d);
    assert_int_equal(kent_directory_find(&d, "PI2"), -1);
}

static void the_nearest_id_is_offered_only_when_it_is_near(void **state)
{
    (void)state;
    kent_directory d = three();
    assert_string_equal(kent_directory_nearest(&d, "EMD"), "END");
    assert_null(kent_directory_nearest(&d, "reservoir"));
    assert_string_equal(kent_directory_nearest(&d, "end"), "END");
    assert_null(kent_directory_nearest(&d, "Q"));
    kent_directory_clear(&d);
}

static void equal_ids_keep_the_order_they_were_added_in(void **state)
{
    (void)state;
    kent_directory d = three();
    assert_int_equal(kent_directory_add(&d, "END", 3, (kent_place){0, 9}), 0);
    kent_directory_sort(&d);
    assert_int_equal(kent_directory_find(&d, "END"), 1);
    kent_directory_clear(&d);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(an_id_is_found_with_the_index_it_was_added_with),
        cmocka_unit_test(the_nearest_id_is_offered_only_when_it_is_near),
        cmocka_unit_test(equal_ids_keep_the_order_they_were_added_in),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
