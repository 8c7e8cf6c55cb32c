#include "kent_check.h"
#include "kent_table.h"

#include <string.h>

static const kent_column COLUMNS[] = {{"name", "", KENT_ALIGN_LEFT, true},
                                      {"bar", "", KENT_ALIGN_RIGHT, false}};

static kent_table two_columns(void)
{
    return (kent_table){.columns = COLUMNS, .column_count = 2};
}

static void accents_take_one_column_each(void **state)
{
    (void)state;
    kent_table t = two_columns();
    kent_text out = {0};
    kent_table_cell(&t, "%s", "Påls bød");
    kent_table_cell(&t, "%s", "1.0");
    kent_table_cell(&t, "%s", "Pals bod");
    kent_table_cell(&t, "%s", "11.0");
    assert_false(kent_table_print(&t, 100, &out));
    assert_string_equal(kent_text_of(&out), "name       bar\n"
                                            "Påls bød   1.0\n"
                                            "Pals bod  11.0\n");
    kent_text_clear(&out);
    kent_table_clear(&t);
}

static void a_line_that_is_too_long_loses_blanks_before_letters(void **state)
{
    (void)state;
    kent_table t = two_columns();
    kent_text out = {0};
    kent_table_cell(&t, "%s", "123456789");
    kent_table_cell(&t, "%s", "1.0");
    assert_int_equal(kent_table_width(&t), 14);
    assert_false(kent_table_print(&t, 13, &out));
    assert_string_equal(kent_text_of(&out), "name      bar\n123456789 1.0\n");
    kent_text_reset(&out);
    assert_true(kent_table_print(&t, 12, &out));
    assert_string_equal(kent_text_of(&out), "name     bar\n1234567… 1.0\n");
    kent_text_clear(&out);
    kent_table_clear(&t);
}

static void numbers_are_never_cut(void **state)
{
    (void)state;
    kent_table t = two_columns();
    kent_text out = {0};
    kent_table_cell(&t, "%s", "a long name here");
    kent_table_cell(&t, "%s", "123456789.0");
    (void)kent_table_print(&t, 5, &out);
    assert_non_null(strstr(kent_text_of(&out), "123456789.0"));
    kent_text_clear(&out);
    kent_table_clear(&t);
}

static void a_control_character_cannot_break_a_line(void **state)
{
    (void)state;
    kent_table t = two_columns();
    kent_text out = {0};
    kent_table_cell(&t, "%s", "a\nb\x1b[31m\tc");
    kent_table_cell(&t, "%s", "1");
    (void)kent_table_print(&t, 0, &out);
    assert_string_equal(kent_text_of(&out), "name        bar\na?b?[31m?c    1\n");
    kent_text_clear(&out);
    kent_table_clear(&t);
}

static void a_paragraph_breaks_at_blanks_under_its_lead(void **state)
{
    (void)state;
    kent_text out = {0};
    kent_table_paragraph(&out, 30, "a  ",
                         "thrust blocks want undisturbed ground, says everybody");
    assert_string_equal(kent_text_of(&out), "a  thrust blocks want\n"
                                            "   undisturbed ground, says\n"
                                            "   everybody\n");
    kent_text_clear(&out);
}

static void a_number_keeps_the_unit_behind_it(void **state)
{
    (void)state;
    kent_text out = {0};
    kent_table_paragraph(&out, 24, "",
                         "highest 14.90 bar at VC (7.5 s), lowest 0.42 bar");
    assert_string_equal(kent_text_of(&out), "highest 14.90 bar at VC\n"
                                            "(7.5 s), lowest 0.42 bar\n");
    kent_text_reset(&out);
    kent_table_paragraph(&out, 23, "",
                         "highest 14.90 bar at VC (7.5 s), lowest 0.42 bar");
    assert_string_equal(kent_text_of(&out), "highest 14.90 bar at VC\n"
                                            "(7.5 s), lowest\n"
                                            "0.42 bar\n");
    kent_text_reset(&out);
    kent_table_paragraph(&out, 20, "",
                         "1 2 3 4 5 6 7 8 9 10 11 12"); /* nothing better */
    assert_string_equal(kent_text_of(&out), "1 2 3 4 5 6 7 8 9 10\n11 12\n");
    kent_text_clear(&out);
}

static void a_word_longer_than_the_line_is_broken_not_lost(void **state)
{
    (void)state;
    kent_text out = {0};
    kent_table_paragraph(&out, 24, "", "ααααααααααααααααααααααααααααα");
    assert_string_equal(kent_text_of(&out), "αααααααααααααααααααααααα\nααααα\n");
    kent_text_clear(&out);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(accents_take_one_column_each),
        cmocka_unit_test(a_line_that_is_too_long_loses_blanks_before_letters),
        cmocka_unit_test(numbers_are_never_cut),
        cmocka_unit_test(a_control_character_cannot_break_a_line),
        cmocka_unit_test(a_paragraph_breaks_at_blanks_under_its_lead),
        cmocka_unit_test(a_number_keeps_the_unit_behind_it),
        cmocka_unit_test(a_word_longer_than_the_line_is_broken_not_lost),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
