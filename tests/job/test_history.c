#include "kent_check.h"
#include "kent_history.h"

enum { STEPS = 1000, ROWS = 50 };

/* One place whose head is 0 but for one instant. */
static kent_history kept_with_a_spike(size_t spike, size_t rows)
{
    kent_error err = {0};
    kent_history h = {0};
    kent_history_keeper *k = NULL;
    assert_int_equal(kent_history_keeper_new(STEPS, rows, 1, 0, &k, &err), KENT_OK);
    for (size_t i = 0; i < STEPS; i++) {
        const double head = i == spike ? 7.0 : 0.0, flow = (double)i;
        kent_history_keep(k, 0.1 * (double)i, &head, &flow, NULL);
    }
    assert_int_equal(kent_history_finish(k, &h, &err), KENT_OK);
    kent_history_keeper_free(k);
    return h;
}

static void a_spike_between_the_even_rows_is_kept_with_its_own_flow(void **state)
{
    (void)state;
    kent_history h = kept_with_a_spike(333, ROWS);
    size_t found = 0;
    for (size_t i = 0; i < h.rows; i++) {
        if (h.head[i] < 7.0) continue;
        found++;
        assert_close(h.time[i], 33.3, 1e-12);
        assert_close(h.flow[i], 333.0, 0.0);
    }
    assert_int_equal(found, 1);
    kent_history_clear(&h);
}

static void rows_rise_in_time_and_stay_within_what_was_asked(void **state)
{
    (void)state;
    kent_history h = kept_with_a_spike(500, ROWS);
    assert_true(h.rows >= ROWS - 1 && h.rows <= ROWS + 3);
    for (size_t i = 1; i < h.rows; i++) {
        assert_true(h.time[i] > h.time[i - 1]);
    }
    kent_history_clear(&h);
}

static void every_instant_is_kept_where_there_is_room(void **state)
{
    (void)state;
    kent_history h = kept_with_a_spike(10, 5000);
    assert_int_equal(h.rows, STEPS);
    kent_history_clear(&h);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_spike_between_the_even_rows_is_kept_with_its_own_flow),
        cmocka_unit_test(rows_rise_in_time_and_stay_within_what_was_asked),
        cmocka_unit_test(every_instant_is_kept_where_there_is_room),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
