/* work_out < explained.txt: fails unless every printed formula gives its result. */
#include "kent_check.h"
#include "kent_worked.h"

#include <stdio.h>
#include <string.h>

static void every_formula_gives_its_printed_result(void **state)
{
    (void)state;
    static char text[1 << 20];
    const size_t length = fread(text, 1, sizeof text - 1, stdin);
    assert_true(length > 0 && length < sizeof text - 1);
    text[length] = '\0';
    const size_t lines = kent_worked_check(text);
    assert_true(lines > 0);
    print_message("%zu formulas worked out\n", lines);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_formula_gives_its_printed_result),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
