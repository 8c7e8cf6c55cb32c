#include "kent_check.h"
#include "kent_sink.h"

static void a_full_disk_is_a_write_error(void **state)
{
    (void)state;
    FILE *full = fopen("/dev/full", "w");
    assert_non_null(full);
    assert_int_equal(setvbuf(full, NULL, _IONBF, 0), 0);
    kent_text text = {0};
    kent_text_add(&text, "something");
    assert_int_equal(kent_sink_flush(kent_sink_stream(full), &text), KENT_E_IO);
    kent_text_clear(&text);
    (void)fclose(full);
}

static void text_that_lost_a_piece_is_never_handed_on(void **state)
{
    (void)state;
    kent_text text = {0};
    kent_text_add(&text, "half");
    text.failed = true;
    FILE *none = fopen("/dev/null", "w");
    assert_non_null(none);
    assert_int_equal(kent_sink_flush(kent_sink_stream(none), &text), KENT_E_NOMEM);
    (void)fclose(none);
    kent_text_clear(&text);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_full_disk_is_a_write_error),
        cmocka_unit_test(text_that_lost_a_piece_is_never_handed_on),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
