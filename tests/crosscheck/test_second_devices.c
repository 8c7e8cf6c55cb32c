/* Every device by the second method against the march, which shares none of its code:
 * highest and lowest heads at both ends of every span within 2 % of the swing (common
 * practice, no source) of slow events; of a sudden one within what is said. */
#include "march.h"
#include "nets.h"

#include <math.h>

/* R (80 m) - M - E, 1200 m of rough pipe; a valve at E that shuts in `ramp` s. */
static kent_build valve_main(double ramp, double duration)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "M", 700.0, 0.0, 0.0);
    kent_build_point(&b, "E", 1200.0, 0.0, 0.0);
    for (int i = 0; i < 2; i++) {
        const int p = kent_build_pipe(&b, i == 0 ? "one" : "two",
                                      i == 0 ? "R M" : "M E", 0.5, 1000.0);
        b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
        b.model->pipes[p].friction_coefficient = 0.2e-3;
    }
    kent_build_fixed_level(&b, "R", 80.0);
    const int v = kent_build_valve(&b, "V", "E", 0.04, 0.0);
    const int s = kent_build_scenario(&b, "shut", duration);
    if (ramp > 0.0) kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.5, ramp, 0.0);
    return b;
}

/* share: of the swing that highest and lowest heads may differ by. */
static void assert_both_agree(kent_build *b, double share)
{
    enum { ENDS = 8 };
    kent_watch ends[ENDS];
    double high[ENDS], low[ENDS];
    kent_second_peak peaks[ENDS];
    kent_error err = {0};
    kent_trace trace = {0};
    kent_build_derive(b);
    const size_t count = 2 * b->model->span_count;
    assert_true(count <= ENDS && b->model->point_count <= ENDS);
    for (size_t i = 0; i < count; i++) {
        ends[i] = (kent_watch){(int)(i / 2),
                               i % 2 == 1 ? b->model->spans[i / 2].length : 0.0};
        high[i] = -INFINITY;
        low[i] = INFINITY;
    }
    const double duration = b->model->scenarios[0].duration;
    march m = march_new(b, duration, 0, ends, count, 1);
    do {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        for (size_t i = 0; i < count; i++) {
            high[i] = fmax(high[i], trace.head[i]);
            low[i] = fmin(low[i], trace.head[i]);
        }
    } while (trace.time[0] < duration);
    (void)nets_run(b, m.steady, 0, 0.0, (kent_mesh){5.0, 1, 1.0}, peaks);

    for (size_t p = 0; p < b->model->point_count; p++) {
        double highest = -INFINITY, lowest = INFINITY, swing = 0.0;
        for (size_t i = 0; i < count; i++) {
            swing = fmax(swing, high[i] - low[i]);
            const int node = b->model->spans[i / 2].node[i % 2];
            if (b->model->nodes[node].point != (int)p) continue;
            highest = fmax(highest, high[i]);
            lowest = fmin(lowest, low[i]);
        }
        print_message("%s: %.3f %.3f m by the march, %+.3f %+.3f\n",
                      b->model->points[p].id, highest, lowest,
                      peaks[p].highest - highest, peaks[p].lowest - lowest);
        assert_within(peaks[p].highest, highest, share * swing);
        assert_within(peaks[p].lowest, lowest, share * swing);
    }
    march_clear(&m);
}

static void surge_tank(void **state)
{
    (void)state;
    kent_build b = valve_main(2.4, 60.0);
    const int t = kent_build_surge_tank(&b, "T", "M", 3.0);
    b.model->surge_tanks[t].loss_in = 2.0;
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

static void air_vessel(void **state)
{
    (void)state;
    kent_build b = valve_main(2.4, 40.0);
    const int v = kent_build_air_vessel(&b, "T", "M", 6.0, 2.0);
    b.model->air_vessels[v].area = 4.0;
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

static void one_way_tank(void **state)
{
    (void)state;
    kent_build b = valve_main(2.4, 12.0);
    kent_build_one_way_tank(&b, "T", "M", 5.0, 20.0);
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

static void relief_valve(void **state)
{
    (void)state;
    kent_build b = valve_main(4.8, 10.0);
    kent_build_relief_valve(&b, "T", "M", 9e5, 0.02);
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

static void control_valve(void **state)
{
    (void)state;
    kent_build b = valve_main(12.0, 30.0);
    kent_build_control_valve(&b, "T", "M", "E", KENT_HOLDS_DOWNSTREAM, 4e5);
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

static void check_valve(void **state)
{
    (void)state;
    kent_build b = valve_main(2.4, 8.0);
    kent_build_check_valve(&b, "T", "M", "E");
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

static void level_that_rises(void **state)
{
    (void)state;
    const kent_law_point law[] = {{0.0, 80.0}, {5.0, 90.0}, {10.0, 80.0}};
    kent_build b = valve_main(0.0, 30.0);
    const int e = kent_build_law(&b, 0, KENT_EVENT_FIXED_LEVEL, 0, 1.0, law, 3);
    b.model->events[e].period = 10.0;
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

/* A main that pumps to a level, behind whose pump power is lost at once. */
static kent_build pumped_main(kent_check_kind check)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "P", 0.0, 0.0, 0.0);
    kent_build_point(&b, "M", 500.0, 0.0, 5.0);
    kent_build_point(&b, "L", 1500.0, 0.0, 20.0);
    for (int i = 0; i < 2; i++) {
        const int p = kent_build_pipe(&b, i == 0 ? "one" : "two",
                                      i == 0 ? "P M" : "M L", 0.4, 1000.0);
        b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
        b.model->pipes[p].friction_coefficient = 0.2e-3;
    }
    kent_build_fixed_level(&b, "L", 45.0);
    const int p = kent_build_pump(&b, "pump", "P", NULL, 60.0, 0.06, 50.0);
    b.model->pumps[p].suction_level = 2.0;
    b.model->pumps[p].in_parallel = b.model->pumps[p].running = 2;
    b.model->pumps[p].check_valve = check;
    b.model->pumps[p].check_delay = 0.2;
    const int s = kent_build_scenario(&b, "trip", 15.0);
    const int e = kent_build_ramp(&b, s, KENT_EVENT_PUMP, p, 1.0, 0.0, 0.0);
    b.model->events[e].action = KENT_TRIP;
    b.model->events[e].ramp_time = NAN;
    return b;
}

static void tripped_pump_behind_an_ideal_check_valve(void **state)
{
    (void)state;
    kent_build b = pumped_main(KENT_CHECK_IDEAL);
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

/* As cells get shorter the second method comes to the march: at the pump, after the
 * wave that its check valve stops has come back. */
static void a_tripped_pump_s_peaks_come_together(void **state)
{
    (void)state;
    kent_build b = pumped_main(KENT_CHECK_IDEAL);
    const kent_watch pump = {0, 0.0};
    const double cells[] = {40.0, 20.0, 10.0};
    double highest = -INFINITY, before = INFINITY;
    kent_error err = {0};
    kent_trace trace = {0};
    kent_build_derive(&b);
    march m = march_new(&b, 15.0, 0, &pump, 1, 1);
    do {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        highest = fmax(highest, trace.head[0]);
    } while (trace.time[0] < 15.0);
    for (size_t i = 0; i < sizeof cells / sizeof cells[0]; i++) {
        kent_second_peak peaks[3];
        (void)nets_run(&b, m.steady, 0, 0.0, (kent_mesh){cells[i], 1, 1.0}, peaks);
        const double apart = fabs(peaks[0].highest - highest);
        print_message("cells of %g m: %.3f m apart\n", cells[i], apart);
        assert_true(apart < 0.8 * before);
        before = apart;
    }
    march_clear(&m);
    kent_build_clear(&b);
}

static void tripped_pump_that_turns_back(void **state)
{
    (void)state;
    kent_build b = pumped_main(KENT_CHECK_NONE);
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

static void one_pump_of_two_trips_with_a_late_check_valve(void **state)
{
    (void)state;
    kent_build b = pumped_main(KENT_CHECK_DELAYED);
    b.model->events[0].how_many = 1;
    assert_both_agree(&b, 0.03); /* a front */
    kent_build_clear(&b);
}

/* The vessel throws the disc of the check valve shut; what rebounds between both opens
 * it again for a moment, near its seat (13.14). */
static void late_check_valve_close_to_a_vessel(void **state)
{
    (void)state;
    kent_build b = pumped_main(KENT_CHECK_DELAYED);
    b.model->points[1].at = (kent_vec3){25.0, 0.0, 0.0};
    kent_build_air_vessel(&b, "A", "M", 5.0, 2.0);
    assert_both_agree(&b, 0.03); /* a front */
    kent_build_clear(&b);
}

/* The slam finds a relief valve that opens at once open. */
static void late_check_valve_beside_a_relief_valve(void **state)
{
    (void)state;
    kent_build b = pumped_main(KENT_CHECK_DELAYED);
    b.model->points[1].at = (kent_vec3){25.0, 0.0, 0.0};
    kent_build_air_vessel(&b, "A", "M", 5.0, 2.0);
    kent_build_relief_valve(&b, "B", "P", 5.5e5, 0.1);
    assert_both_agree(&b, 0.03); /* a front */
    kent_build_clear(&b);
}

static void pump_stopped_and_started(void **state)
{
    (void)state;
    kent_build b = pumped_main(KENT_CHECK_IDEAL);
    b.model->events[0].action = KENT_STOP;
    b.model->events[0].ramp_time = 4.0;
    const int e = kent_build_ramp(&b, 0, KENT_EVENT_PUMP, 0, 8.0, 4.0, 1.0);
    b.model->events[e].action = KENT_START;
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

static void burst(void **state)
{
    (void)state;
    kent_build b = valve_main(0.0, 10.0);
    b.model->bursts = kent_alloc(1, sizeof *b.model->bursts);
    assert_non_null(b.model->bursts);
    b.model->bursts[b.model->burst_count++].point = 1;
    const int e = kent_build_ramp(&b, 0, KENT_EVENT_BURST, 0, 1.0, 3.0, 0.01);
    b.model->events[e].coefficient = 0.6;
    assert_both_agree(&b, 0.02);
    kent_build_clear(&b);
}

static void air_valve(void **state)
{
    (void)state;
    kent_build b = pumped_main(KENT_CHECK_IDEAL);
    b.model->points[1].at.z = 42.0;
    kent_build_air_valve(&b, "A", "M", 0.1, 0.1);
    assert_both_agree(&b, 0.05); /* the slam of the last air is a front */
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(surge_tank),
        cmocka_unit_test(air_vessel),
        cmocka_unit_test(one_way_tank),
        cmocka_unit_test(relief_valve),
        cmocka_unit_test(control_valve),
        cmocka_unit_test(check_valve),
        cmocka_unit_test(level_that_rises),
        cmocka_unit_test(burst),
        cmocka_unit_test(tripped_pump_behind_an_ideal_check_valve),
        cmocka_unit_test(a_tripped_pump_s_peaks_come_together),
        cmocka_unit_test(tripped_pump_that_turns_back),
        cmocka_unit_test(one_pump_of_two_trips_with_a_late_check_valve),
        cmocka_unit_test(late_check_valve_close_to_a_vessel),
        cmocka_unit_test(late_check_valve_beside_a_relief_valve),
        cmocka_unit_test(pump_stopped_and_started),
        cmocka_unit_test(air_valve),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
