#include "kent_status.h"
#include "kent_check.h"

#include <string.h>

static void every_status_has_its_own_words(void **state)
{
    (void)state;
#define AS_ITEM(name, text) name,
    const kent_status all[] = {KENT_STATUS_LIST(AS_ITEM)};
#undef AS_ITEM
    const size_t count = sizeof all / sizeof all[0];
    for (size_t i = 0; i < count; i++) {
        assert_true(strlen(kent_status_text(all[i])) > 0);
        assert_string_not_equal(kent_status_text(all[i]), "unknown status");
        for (size_t j = 0; j < i; j++) {
            assert_string_not_equal(kent_status_text(all[i]), kent_status_text(all[j]));
        }
    }
}

static void done_is_zero(void **state)
{
    (void)state;
    assert_int_equal(KENT_OK, 0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_status_has_its_own_words),
        cmocka_unit_test(done_is_zero),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
