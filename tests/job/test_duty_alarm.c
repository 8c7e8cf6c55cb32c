/* Every alarm of devices in the steady state once raised, and all silent where a
 * station does what it should. */
#include "kent_duty_alarm.h"
#include "kent_build.h"
#include "kent_check.h"

#include <string.h>

/* Draws from 10 m and delivers through 1 km of frictionless 300 mm to `level`. */
static kent_build station(double level)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "P", 0.0, 0.0, 8.0);
    kent_build_point(&b, "R", 1000.0, 0.0, 20.0);
    kent_build_pipe(&b, "A", "P R", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", level);
    const int p = kent_build_pump(&b, "PS", "P", NULL, 60.0, 0.07, 45.0);
    b.model->pumps[p].suction_level = 10.0;
    b.model->pumps[p].check_valve = KENT_CHECK_IDEAL;
    return b;
}

/* Clears b. words: of the last of so many alarms. */
static void assert_raises(kent_build *b, size_t count, const char *words)
{
    kent_notes notes = {0};
    kent_error err = {0};
    kent_steady *steady = NULL;
    kent_build_derive(b);
    if (kent_steady_solve(b->model, &steady, &err)) fail_msg("%s", err.what);
    kent_duty_alarms_raise(b->model, &steady, 1, &notes);
    assert_int_equal(notes.count, count);
    if (count > 0 && !strstr(notes.text[count - 1], words)) {
        fail_msg("no '%s' in: %s", words, notes.text[count - 1]);
    }
    kent_notes_clear(&notes);
    kent_steady_free(steady);
    kent_build_clear(b);
}

/* words NULL: none is raised. */
static void assert_raised(kent_build *b, const char *words)
{
    assert_raises(b, words ? 1 : 0, words);
}

static void a_station_on_its_curve_raises_nothing(void **state)
{
    (void)state;
    kent_build b = station(50.0);
    kent_build_relief_valve(&b, "RV", "P", 8e5, 0.01);
    assert_raised(&b, NULL);
}

static void a_pump_that_does_not_deliver_is_told(void **state)
{
    (void)state;
    kent_build b = station(75.0);
    assert_raised(&b,
                  "pump PS: it runs without delivering: it lifts 60.00 m at no flow "
                  "and 65.00 m are needed");
}

static void a_pump_beyond_its_curve_is_told(void **state)
{
    (void)state;
    kent_build b = station(10.0);
    assert_raised(&b, "beyond the end of its curve at 105.0 L/s");
}

static void units_that_stand_without_a_check_valve_are_told(void **state)
{
    (void)state;
    kent_build b = station(50.0);
    b.model->pumps[0].check_valve = KENT_CHECK_NONE;
    b.model->pumps[0].in_parallel = 2;
    b.model->fixed_levels[0].level = 40.0;
    assert_raised(&b, "pump PS: 1 of 2 units stand and have no check valve");
    kent_build c = station(50.0);
    c.model->pumps[0].check_valve = KENT_CHECK_NONE;
    c.model->pumps[0].running = 0;
    assert_raised(&c, "pump PS: it stands still and");
}

static void units_that_stand_in_the_way_of_water_are_told(void **state)
{
    (void)state;
    kent_build b = station(50.0);
    b.model->pumps[0].running = 0;
    assert_raised(&b, NULL);
    kent_build c = station(8.0); /* below the suction level */
    c.model->pumps[0].running = 0;
    assert_raised(&c,
                  "pump PS: units stand, and the head before them is 2.00 m higher");
    kent_build d = station(8.0);
    d.model->pumps[0].check_valve = KENT_CHECK_NONE;
    d.model->pumps[0].running = 0;
    assert_raised(&d, "pump PS: it stands still and");
}

static void a_relief_valve_that_flows_is_told(void **state)
{
    (void)state;
    kent_build b = station(50.0);
    kent_build_relief_valve(&b, "RV", "P", 3.8e5, 0.001);
    assert_raised(&b, "relief valve RV: it passes");
}

/* The march would begin with a valve shut at once. */
static void a_scenario_without_a_relief_valve_that_flows_is_told(void **state)
{
    (void)state;
    for (int flows = 0; flows < 2; flows++) {
        kent_build b = station(50.0);
        kent_build_relief_valve(&b, "RV", "P", flows ? 3.8e5 : 8e5, 0.001);
        (void)kent_build_scenario(&b, "with", 5.0);
        const int bare = kent_build_scenario(&b, "bare", 5.0);
        b.model->without = kent_alloc(1, sizeof *b.model->without);
        assert_non_null(b.model->without);
        b.model->without[0] = (kent_left_out){KENT_DEVICE_RELIEF_VALVE, 0};
        b.model->without_count = b.model->scenarios[bare].without_count = 1;
        assert_raises(&b, flows ? 2 : 0,
                      "scenario bare: it leaves out relief valve RV, which passes");
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_station_on_its_curve_raises_nothing),
        cmocka_unit_test(a_pump_that_does_not_deliver_is_told),
        cmocka_unit_test(a_pump_beyond_its_curve_is_told),
        cmocka_unit_test(units_that_stand_without_a_check_valve_are_told),
        cmocka_unit_test(units_that_stand_in_the_way_of_water_are_told),
        cmocka_unit_test(a_relief_valve_that_flows_is_told),
        cmocka_unit_test(a_scenario_without_a_relief_valve_that_flows_is_told),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
