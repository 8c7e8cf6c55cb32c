#include "kent_error.h"
#include "kent_check.h"

#include <string.h>

static void the_first_cause_stays(void **state)
{
    (void)state;
    kent_error err = {0};
    assert_int_equal(kent_error_set(&err, KENT_E_INPUT, "mains.cfg:42", "%d mm", -300),
                     KENT_E_INPUT);
    assert_int_equal(kent_error_set(&err, KENT_E_IO, "elsewhere", "later"),
                     KENT_E_INPUT);
    assert_int_equal(err.status, KENT_E_INPUT);
    assert_string_equal(err.where, "mains.cfg:42");
    assert_string_equal(err.what, "-300 mm");
}

static void want_of_memory_has_no_place(void **state)
{
    (void)state;
    kent_error err = {0};
    assert_int_equal(kent_error_nomem(&err), KENT_E_NOMEM);
    assert_string_equal(err.where, "");
    assert_string_equal(err.what, kent_status_text(KENT_E_NOMEM));
}

static void a_long_cause_is_cut_and_ended(void **state)
{
    (void)state;
    kent_error err = {0};
    char long_text[2000];
    memset(long_text, 'x', sizeof long_text - 1);
    long_text[sizeof long_text - 1] = '\0';
    (void)kent_error_set(&err, KENT_E_INPUT, long_text, "%s", long_text);
    assert_int_equal(strlen(err.where), sizeof err.where - 1);
    assert_int_equal(strlen(err.what), sizeof err.what - 1);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_first_cause_stays),
        cmocka_unit_test(want_of_memory_has_no_place),
        cmocka_unit_test(a_long_cause_is_cut_and_ended),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
