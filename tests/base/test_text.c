#include "kent_text.h"
#include "kent_alloc_fail.h"
#include "kent_check.h"

#include <string.h>

static void pieces_stand_one_after_another(void **state)
{
    (void)state;
    kent_text t = {0};
    assert_string_equal(kent_text_of(&t), "");
    kent_text_add(&t, "%s is %d mm", "bore", 600);
    kent_text_add(&t, "%s", "; ");
    kent_text_add(&t, "%.3f m", 0.6);
    assert_string_equal(kent_text_of(&t), "bore is 600 mm; 0.600 m");
    assert_int_equal(t.length, strlen(t.s));
    kent_text_reset(&t);
    assert_string_equal(kent_text_of(&t), "");
    kent_text_add(&t, "again");
    assert_string_equal(kent_text_of(&t), "again");
    kent_text_clear(&t);
    kent_text_clear(&t); /* twice is safe */
    assert_false(t.failed);
}

static void a_long_text_is_whole(void **state)
{
    (void)state;
    kent_text t = {0};
    for (int i = 0; i < 10000; i++) {
        kent_text_add(&t, "%04d", i);
    }
    assert_int_equal(t.length, 40000);
    assert_memory_equal(t.s + 39504, "9876", 4);
    kent_text_clear(&t);
}

static int write_two_lines(void *context)
{
    kent_text t = {0};
    (void)context;
    for (int i = 0; i < 100; i++) {
        kent_text_add(&t, "line %d\n", i);
    }
    const bool failed = t.failed;
    /* A text that failed once stays without what came later: no hole in it. */
    if (failed && t.s) assert_int_equal(strncmp(t.s, "line 0\n", 7), 0);
    kent_text_clear(&t);
    return failed;
}

static void a_failed_allocation_is_remembered(void **state)
{
    (void)state;
    assert_true(kent_allocations_needed(write_two_lines, NULL) > 1);
}

static void columns_count_code_points_but_no_combining_marks(void **state)
{
    (void)state;
    assert_int_equal(kent_text_columns(""), 0);
    assert_int_equal(kent_text_columns("DN 600"), 6);
    assert_int_equal(kent_text_columns("22.5\xC2\xB0"), 5);          /* degree sign */
    assert_int_equal(kent_text_columns("\xE2\x88\x91 \xCF\x81"), 3); /* sum, rho */
    assert_int_equal(kent_text_columns("e\xCC\x81"), 1);             /* e and accent */
    assert_int_equal(kent_text_columns("\xF0\x9F\x92\xA7"), 1);      /* four bytes */
    assert_int_equal(kent_text_columns("ab\xC3"), 3);                /* cut short */
}

/* The table of well-formed sequences of RFC 3629, section 4. */
static void a_sequence_is_one_code_point_well_formed(void **state)
{
    (void)state;
    static const struct {
        const char *text;
        size_t bytes;
    } ROWS[] = {
        {"", 1},
        {"a", 1},
        {"\x80", 0},
        {"\xC1\xBF", 0}, /* another spelling of a shorter one */
        {"\xC2\x80", 2},
        {"\xDF\xBF", 2},
        {"\xE0\x9F\xBF", 0},
        {"\xE0\xA0\x80", 3},
        {"\xED\x9F\xBF", 3},
        {"\xED\xA0\x80", 0}, /* half of a pair */
        {"\xEF\xBF\xBF", 3},
        {"\xF0\x8F\xBF\xBF", 0},
        {"\xF0\x90\x80\x80", 4},
        {"\xF4\x8F\xBF\xBF", 4},
        {"\xF4\x90\x80\x80", 0},
        {"\xF5\x80\x80\x80", 0},
        {"\xE2\x82", 0}, /* cut short */
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        assert_int_equal(kent_text_sequence(ROWS[i].text), ROWS[i].bytes);
    }
}

static void distance_is_the_number_of_edits(void **state)
{
    (void)state;
    assert_int_equal(kent_text_misspelling("bore", "BORE"), 0);
    assert_int_equal(kent_text_misspelling("bore", "boer"), 2);
    assert_true(kent_text_misspelling("bore", "wall") == SIZE_MAX);
    assert_true(kent_text_misspelling("x", "h") == SIZE_MAX); /* nothing in common */
    assert_int_equal(kent_text_misspelling("R1", "R"), 1);
    assert_int_equal(kent_text_distance("bore", "bore"), 0);
    assert_int_equal(kent_text_distance("", "bore"), 4);
    assert_int_equal(kent_text_distance("bore", "bores"), 1);
    assert_int_equal(kent_text_distance("lenght", "length"), 2);
    assert_int_equal(kent_text_distance("kitten", "sitting"), 3); /* Levenshtein's own
                                                                     textbook pair */
    assert_int_equal(kent_text_distance("valve", "vlave"),
                     kent_text_distance("vlave", "valve"));
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(pieces_stand_one_after_another),
        cmocka_unit_test(a_long_text_is_whole),
        cmocka_unit_test(a_failed_allocation_is_remembered),
        cmocka_unit_test(columns_count_code_points_but_no_combining_marks),
        cmocka_unit_test(a_sequence_is_one_code_point_well_formed),
        cmocka_unit_test(distance_is_the_number_of_edits),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
