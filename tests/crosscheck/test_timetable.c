/* What events make of a value. */
#include "kent_timetable_internal.h"
#include "nets.h"

/* One outflow of 0.1 m3/s at E. */
static kent_build one_outflow(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", 100.0, 0.0, 0.0);
    kent_build_pipe(&b, "main", "R E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_outflow(&b, "E", 0.1);
    kent_build_scenario(&b, "s", 20.0);
    return b;
}

static kent_timetable filled(const kent_build *b)
{
    kent_timetable t = {0};
    kent_error err = {0};
    assert_int_equal(
        kent_timetable_fill(&t, b->model, 0, KENT_EVENT_OUTFLOW, 0, 0.1, &err),
        KENT_OK);
    return t;
}

static void assert_value(kent_timetable *t, double time, double want)
{
    kent_timetable_move(t, time);
    assert_within(kent_timetable_value(t, time), want, 1e-15);
}

static void a_later_event_takes_over_where_the_first_has_got(void **state)
{
    (void)state;
    kent_build b = one_outflow();
    kent_build_ramp(&b, 0, KENT_EVENT_OUTFLOW, 0, 1.0, 4.0, 0.5);
    kent_build_ramp(&b, 0, KENT_EVENT_OUTFLOW, 0, 3.0, 2.0, 0.1);
    kent_timetable t = filled(&b);
    assert_value(&t, 0.5, 0.1);
    assert_value(&t, 2.0, 0.2);
    assert_within(kent_timetable_next(&t), 3.0, 0.0);
    assert_value(&t, 3.0, 0.3);
    assert_value(&t, 4.0, 0.2);
    assert_value(&t, 9.0, 0.1);
    assert_true(isinf(kent_timetable_next(&t)));
    kent_timetable_clear(&t);
    kent_build_clear(&b);
}

static void a_sudden_event_has_both_values_at_its_time(void **state)
{
    (void)state;
    kent_build b = one_outflow();
    kent_build_ramp(&b, 0, KENT_EVENT_OUTFLOW, 0, 2.0, 0.0, 0.0);
    kent_timetable t = filled(&b);
    kent_timetable_move(&t, 1.0);
    assert_within(kent_timetable_value(&t, 2.0), 0.1, 0.0); /* until then */
    kent_timetable_move(&t, 2.0);
    assert_within(kent_timetable_value(&t, 2.0), 0.0, 0.0); /* from then on */
    kent_timetable_clear(&t);
    kent_build_clear(&b);
}

static void a_law_begins_again_after_its_period(void **state)
{
    (void)state;
    const kent_law_point law[] = {{1.0, 0.2}, {2.0, 0.4}, {3.0, 0.3}};
    kent_build b = one_outflow();
    const int e = kent_build_law(&b, 0, KENT_EVENT_OUTFLOW, 0, 2.0, law, 3);
    b.model->events[e].period = 5.0;
    kent_timetable t = filled(&b);
    assert_value(&t, 2.5, 0.1); /* before its first point: what was there */
    assert_value(&t, 3.5, 0.3);
    assert_value(&t, 4.5, 0.35);
    assert_value(&t, 7.5, 0.3); /* after its last */
    assert_value(&t, 8.5, 0.3);
    assert_value(&t, 8.75, 0.35);
    assert_value(&t, 13.25, 0.25);
    kent_timetable_clear(&t);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_later_event_takes_over_where_the_first_has_got),
        cmocka_unit_test(a_sudden_event_has_both_values_at_its_time),
        cmocka_unit_test(a_law_begins_again_after_its_period),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
