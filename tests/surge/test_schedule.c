#include "kent_schedule_internal.h"

#include "kent_build.h"
#include "kent_check.h"

#include <math.h>

typedef struct plan {
    kent_build build;
    int valve, outflow;
    kent_schedule *schedule;
} plan;

static plan plan_new(void)
{
    plan p = {.build = kent_build_new()};
    kent_build *b = &p.build;
    kent_build_point(b, "R", 0.0, 0.0, 0.0);
    kent_build_point(b, "O", 500.0, 0.0, 0.0);
    kent_build_point(b, "E", 1000.0, 0.0, 0.0);
    kent_build_pipe(b, "1", "R O", 0.5, 1000.0);
    kent_build_pipe(b, "2", "O E", 0.5, 1000.0);
    kent_build_fixed_level(b, "R", 50.0);
    p.outflow = kent_build_outflow(b, "O", 0.02);
    p.valve = kent_build_valve(b, "V", "E", 0.1, 0.0);
    b->model->valves[p.valve].opening = 0.8;
    (void)kent_build_scenario(b, "s", 100.0);
    return p;
}

static void plan_ready(plan *p)
{
    kent_error err = {0};
    kent_build_derive(&p->build);
    assert_int_equal(kent_schedule_new(p->build.model, 0, &p->schedule, &err), KENT_OK);
}

static void plan_clear(plan *p)
{
    kent_schedule_free(p->schedule);
    kent_build_clear(&p->build);
}

static double value(const plan *p, size_t course, double time)
{
    assert_true(course < p->schedule->course_count);
    return kent_schedule_value(p->schedule, &p->schedule->courses[course], time);
}

static void a_ramp_starts_from_where_the_valve_stands(void **state)
{
    (void)state;
    plan p = plan_new();
    kent_build_ramp(&p.build, 0, KENT_EVENT_VALVE, p.valve, 2.0, 10.0, 0.0);
    plan_ready(&p);
    assert_close(value(&p, 0, 0.0), 0.8, 1e-15);
    assert_close(value(&p, 0, 2.0), 0.8, 1e-15);
    assert_close(value(&p, 0, 7.0), 0.4, 1e-14);
    assert_true(value(&p, 0, 12.0) == 0.0);
    assert_true(value(&p, 0, 99.0) == 0.0);
    plan_clear(&p);
}

static void a_later_event_takes_over_from_what_was_reached(void **state)
{
    (void)state;
    plan p = plan_new();
    /* listed out of order, and the second begins before the first has ended */
    kent_build_ramp(&p.build, 0, KENT_EVENT_VALVE, p.valve, 6.0, 4.0, 1.0);
    kent_build_ramp(&p.build, 0, KENT_EVENT_VALVE, p.valve, 1.0, 10.0, 0.0);
    plan_ready(&p);
    assert_close(value(&p, 0, 6.0), 0.4, 1e-14);
    assert_close(value(&p, 0, 8.0), 0.7, 1e-14);
    assert_true(value(&p, 0, 10.0) == 1.0);
    plan_clear(&p);
}

static void a_law_is_followed_point_by_point(void **state)
{
    (void)state;
    static const kent_law_point law[] = {
        {1.0, 0.5}, {3.0, 0.1}, {3.0, 0.3}, {5.0, 0.0}};
    plan p = plan_new();
    kent_build_law(&p.build, 0, KENT_EVENT_VALVE, p.valve, 10.0, law, 4);
    plan_ready(&p);
    assert_close(value(&p, 0, 10.5), 0.8, 1e-15); /* before its first point */
    assert_close(value(&p, 0, 12.0), 0.3, 1e-14);
    assert_close(value(&p, 0, 13.0), 0.3, 1e-14); /* a jump: the later value */
    assert_close(value(&p, 0, 14.0), 0.15, 1e-14);
    assert_true(value(&p, 0, 15.0) == 0.0 && value(&p, 0, 50.0) == 0.0);
    plan_clear(&p);
}

static void an_event_without_ramp_acts_at_once(void **state)
{
    (void)state;
    plan p = plan_new();
    kent_build_ramp(&p.build, 0, KENT_EVENT_OUTFLOW, p.outflow, 3.0, 0.0, 0.05);
    plan_ready(&p);
    assert_close(value(&p, 0, 2.999), 0.02, 1e-15);
    assert_true(value(&p, 0, 3.0) == 0.05);
    plan_clear(&p);
}

static void without_a_scenario_nothing_happens(void **state)
{
    (void)state;
    plan p = plan_new();
    kent_error err = {0};
    kent_build_ramp(&p.build, 0, KENT_EVENT_VALVE, p.valve, 2.0, 10.0, 0.0);
    kent_build_derive(&p.build);
    assert_int_equal(kent_schedule_new(p.build.model, -1, &p.schedule, &err), KENT_OK);
    assert_int_equal(p.schedule->course_count, 0);
    plan_clear(&p);
}

/* A tide of 12 s: its law begins again, and what stands before its first point is then
 * the end of the turn before. */
static void a_law_with_a_period_begins_again(void **state)
{
    (void)state;
    static const kent_law_point law[] = {{1.0, 52.0}, {7.0, 46.0}, {11.0, 49.0}};
    plan p = plan_new();
    const int e = kent_build_law(&p.build, 0, KENT_EVENT_FIXED_LEVEL, 0, 2.0, law, 3);
    p.build.model->events[e].period = 12.0;
    plan_ready(&p);
    assert_close(value(&p, 0, 0.0), 50.0, 1e-15);
    assert_close(value(&p, 0, 2.5), 50.0, 1e-15); /* the level it stands at */
    for (int turn = 0; turn < 3; turn++) {
        const double start = 2.0 + 12.0 * turn; /* s */
        assert_close(value(&p, 0, start + 1.0), 52.0, 1e-12);
        assert_close(value(&p, 0, start + 5.0), 48.0, 1e-12);
        assert_close(value(&p, 0, start + 9.0), 47.5, 1e-12);
        assert_close(value(&p, 0, start + 11.5), 49.0, 1e-12);
        if (turn > 0) assert_close(value(&p, 0, start + 0.5), 49.0, 1e-12);
    }
    plan_clear(&p);
}

/* What is drawn at a point by the hour, as shares of a day of 24 s. */
static void what_is_drawn_may_repeat_too(void **state)
{
    (void)state;
    static const kent_law_point law[] = {{0.0, 0.01}, {8.0, 0.05}, {24.0, 0.01}};
    plan p = plan_new();
    const int e =
        kent_build_law(&p.build, 0, KENT_EVENT_OUTFLOW, p.outflow, 5.0, law, 3);
    p.build.model->events[e].period = 24.0;
    plan_ready(&p);
    assert_close(value(&p, 0, 4.9), 0.02, 1e-15); /* the steady one, until then */
    for (int day = 0; day < 3; day++) {
        assert_close(value(&p, 0, 5.0 + 24.0 * day + 4.0), 0.03, 1e-13);
        assert_close(value(&p, 0, 5.0 + 24.0 * day + 16.0), 0.03, 1e-13);
    }
    plan_clear(&p);
}

static void what_no_event_touches_has_no_course(void **state)
{
    (void)state;
    plan p = plan_new();
    kent_model *m = p.build.model;
    m->bursts = kent_alloc(1, sizeof *m->bursts);
    assert_non_null(m->bursts);
    m->bursts[m->burst_count++] = (kent_burst){.point = m->valves[p.valve].point};
    kent_build_ramp(&p.build, 0, KENT_EVENT_BURST, 0, 2.0, 1.0, 0.003);
    plan_ready(&p);
    const kent_course *hole = kent_schedule_course(p.schedule, KENT_EVENT_BURST, 0);
    assert_true(hole == &p.schedule->courses[0]);
    assert_true(value(&p, 0, 2.0) == 0.0); /* whole until then */
    assert_close(value(&p, 0, 2.5), 0.0015, 1e-13);
    assert_null(kent_schedule_course(p.schedule, KENT_EVENT_BURST, 1));
    assert_null(kent_schedule_course(p.schedule, KENT_EVENT_VALVE, 0));
    plan_clear(&p);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_ramp_starts_from_where_the_valve_stands),
        cmocka_unit_test(a_later_event_takes_over_from_what_was_reached),
        cmocka_unit_test(a_law_is_followed_point_by_point),
        cmocka_unit_test(an_event_without_ramp_acts_at_once),
        cmocka_unit_test(a_law_with_a_period_begins_again),
        cmocka_unit_test(what_is_drawn_may_repeat_too),
        cmocka_unit_test(what_no_event_touches_has_no_course),
        cmocka_unit_test(without_a_scenario_nothing_happens),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
