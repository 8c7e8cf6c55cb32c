#include "kent_notes.h"
#include "kent_alloc_fail.h"
#include "kent_check.h"

#include <stdio.h>

static void a_sentence_is_kept_once(void **state)
{
    (void)state;
    kent_notes n = {0};
    kent_notes_add(&n, "cover at %s assumed", "PI1");
    kent_notes_add(&n, "cover at %s assumed", "PI2");
    kent_notes_add(&n, "cover at %s assumed", "PI1");
    assert_int_equal(n.count, 2);
    assert_string_equal(n.text[0], "cover at PI1 assumed");
    assert_string_equal(n.text[1], "cover at PI2 assumed");
    assert_false(n.failed);
    kent_notes_clear(&n);
    kent_notes_clear(&n);
    assert_int_equal(n.count, 0);
}

static void what_is_unsafe_is_marked_and_stays_so(void **state)
{
    (void)state;
    kent_notes n = {0};
    kent_notes_add(&n, "listed");
    kent_notes_warn(&n, "gives way at %d", 3);
    kent_notes_add(&n, "said lightly");
    kent_notes_warn(&n, "said lightly");
    kent_notes_add(&n, "gives way at 3");
    assert_int_equal(n.count, 3);
    assert_false(n.grave[0]);
    assert_true(n.grave[1]);
    assert_true(n.grave[2]);
    kent_notes_clear(&n);
}

static void thousands_of_sentences_keep_their_order(void **state)
{
    (void)state;
    kent_notes n = {0};
    for (int round = 0; round < 2; round++) {
        for (int i = 0; i < 5000; i++) {
            kent_notes_add(&n, "thing %d", i);
        }
    }
    assert_int_equal(n.count, 5000);
    for (int i = 0; i < 5000; i++) {
        char text[32];
        (void)snprintf(text, sizeof text, "thing %d", i);
        assert_string_equal(n.text[i], text);
    }
    kent_notes_clear(&n);
}

static int note_twenty_things(void *context)
{
    kent_notes n = {0};
    (void)context;
    for (int i = 0; i < 20; i++) {
        kent_notes_add(&n, "thing %d", i);
    }
    const bool failed = n.failed;
    if (!failed) assert_int_equal(n.count, 20);
    kent_notes_clear(&n);
    return failed;
}

static void a_lost_note_is_remembered(void **state)
{
    (void)state;
    assert_true(kent_allocations_needed(note_twenty_things, NULL) > 20);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_sentence_is_kept_once),
        cmocka_unit_test(what_is_unsafe_is_marked_and_stays_so),
        cmocka_unit_test(thousands_of_sentences_keep_their_order),
        cmocka_unit_test(a_lost_note_is_remembered),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
