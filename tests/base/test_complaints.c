#include "kent_complaints.h"
#include "kent_check.h"

#include <stdio.h>

static void all_are_counted_and_twenty_kept(void **state)
{
    (void)state;
    kent_complaints c = {0};
    for (int i = 0; i < 33; i++) {
        kent_complain(&c, "a.cfg", i + 1, "complaint %d", i);
    }
    assert_int_equal(c.count, 33);
    assert_string_equal(c.kept[KENT_COMPLAINTS_KEPT - 1].what, "complaint 19");
    kent_complaints_sort(&c);
    assert_string_equal(c.kept[0].what, "complaint 0");
    assert_int_equal(c.count, 33);
}

static void they_sort_by_file_as_first_met_then_line_then_order(void **state)
{
    (void)state;
    kent_complaints c = {0};
    kent_complain(&c, "main.cfg", 9, "d");
    kent_complain(&c, "added.cfg", 3, "f");
    kent_complain(&c, "main.cfg", 4, "b");
    kent_complain(&c, "main.cfg", 4, "c");
    kent_complain(&c, "main.cfg", 0, "a");
    kent_complain(&c, "added.cfg", 1, "e");
    kent_complaints_sort(&c);
    for (int i = 0; i < 6; i++) {
        const char want[2] = {(char)('a' + i), '\0'};
        assert_string_equal(c.kept[i].what, want);
    }
    assert_string_equal(c.kept[0].file, "main.cfg");
    assert_string_equal(c.kept[5].file, "added.cfg");
}

static void a_message_is_one_line_of_utf8(void **state)
{
    (void)state;
    kent_complaints c = {0};
    kent_complain(&c, "a.cfg", 1, "\"%s\"", "K\nb.cfg:1: \x1B[31m\x7F");
    assert_string_equal(c.kept[0].what, "\"K?b.cfg:1: ?[31m?\"");
    kent_complain(&c, "a.cfg", 1, "\"%.4s\", %s", "abc\xC3\xA4", "\xC3\xA4");
    assert_string_equal(c.kept[1].what, "\"abc\", \xC3\xA4");
}

static void an_empty_list_sorts(void **state)
{
    (void)state;
    kent_complaints c = {0};
    kent_complaints_sort(&c);
    assert_int_equal(c.count, 0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(all_are_counted_and_twenty_kept),
        cmocka_unit_test(they_sort_by_file_as_first_met_then_line_then_order),
        cmocka_unit_test(a_message_is_one_line_of_utf8),
        cmocka_unit_test(an_empty_list_sorts),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
