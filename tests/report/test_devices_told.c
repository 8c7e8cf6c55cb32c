/* What devices do, from the march to histories and results. Invented. */
#include "kent_mixed.h"

#include "kent_check.h"

#include <jansson.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* Two pumps that trip, a vessel, a tank, and a burst in another scenario that leaves
 * the vessel out. */
static kent_build pumped_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "PH", 0.0, 0.0, 5.0);
    kent_build_point(&b, "K1", 600.0, 0.0, 15.0);
    kent_build_point(&b, "K2", 1300.0, 200.0, 20.0);
    kent_build_point(&b, "R", 2000.0, 200.0, 30.0);
    kent_build_pipe(&b, "A", "PH K1 K2 R", 0.4, 1000.0);
    b.model->pipes[0].friction = KENT_COLEBROOK_WHITE;
    b.model->pipes[0].friction_coefficient = 2e-4;
    kent_build_fixed_level(&b, "R", 45.0);
    const int pump = kent_build_pump(&b, "PS", "PH", NULL, 70.0, 0.08, 50.0);
    b.model->pumps[pump].suction_level = 6.0;
    b.model->pumps[pump].in_parallel = b.model->pumps[pump].running = 2;
    b.model->pumps[pump].check_valve = KENT_CHECK_IDEAL;
    kent_build_air_vessel(&b, "VES", "PH", 5.0, 2.0);
    const int tank = kent_build_surge_tank(&b, "ST", "K2", 4.0);
    b.model->surge_tanks[tank].overflow_level = 52.0;
    b.model->bursts = kent_alloc(1, sizeof *b.model->bursts);
    assert_non_null(b.model->bursts);
    b.model->bursts[0].point = 1;
    b.model->burst_count = 1;
    const int trip = kent_build_scenario(&b, "trip", 40.0);
    kent_build_ramp(&b, trip, KENT_EVENT_PUMP, pump, 1.0, 0.0, 0.0);
    b.model->events[b.model->event_count - 1].action = KENT_TRIP;
    const int burst = kent_build_scenario(&b, "burst", 10.0);
    kent_build_ramp(&b, burst, KENT_EVENT_BURST, 0, 1.0, 0.2, 0.01);
    b.model->events[b.model->event_count - 1].coefficient = 0.6;
    b.model->without = kent_alloc(1, sizeof *b.model->without);
    assert_non_null(b.model->without);
    b.model->without[0] = (kent_left_out){KENT_DEVICE_AIR_VESSEL, 0};
    b.model->without_count = b.model->scenarios[burst].without_count = 1;
    b.model->solver.history_rows = 100000;
    kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
    return b;
}

static kent_results *run(kent_build *b)
{
    kent_results *r = NULL;
    kent_error err = {0};
    kent_build_derive(b);
    if (kent_job_run(b->model, &(kent_job_options){.threads = 1}, &r, &err)) {
        fail_msg("%s: %s", err.where, err.what);
    }
    return r;
}

static size_t device_of(const kent_results *r, const char *id)
{
    const int d = kent_model_device_index(r->model, id);
    assert_true(d >= 0);
    return (size_t)d;
}

static void extremes_are_those_of_the_history(void **state)
{
    (void)state;
    kent_build b = pumped_main();
    kent_results *r = run(&b);
    const size_t ves = device_of(r, "VES"), ps = device_of(r, "PS");
    const kent_scenario_result *trip = &r->scenarios[0];
    const kent_history *h = &trip->history;
    double least = INFINITY, least_at = 0.0, most_flow = 0.0;
    size_t column = 0;
    while (r->history_points[column] != 0) {
        column++;
    }
    assert_int_equal(h->rows, trip->steps + 1);
    assert_int_equal(h->device_count, 4);
    for (size_t i = 0; i < h->rows; i++) {
        const kent_device_row *row = h->devices + i * h->device_count;
        if (row[ves].told[0] < least) {
            least = row[ves].told[0];
            least_at = h->time[i];
        }
        most_flow = fmax(most_flow, row[ves].flow);
        /* a point's flow is that through what stands there: the first, the pumps */
        assert_true(h->flow[i * h->watch_count + column] == row[ps].flow);
    }
    assert_true(trip->devices[ves].told[0].lowest == least);
    assert_true(trip->devices[ves].told[0].lowest_at == least_at);
    assert_true(trip->devices[ves].flow.highest == most_flow);
    assert_true(least < 2.0 && most_flow > 0.01); /* it yielded, and filled again */
    assert_true(trip->devices[ps].flow.lowest == 0.0 &&
                trip->devices[ps].flow.highest > 0.1);
    assert_true(isnan(r->scenarios[1].devices[ves].told[0].highest)); /* left out */
    kent_results_free(r);
    kent_build_clear(&b);
}

static void a_tank_that_overflows_is_cautioned(void **state)
{
    (void)state;
    const kent_law_point rise[] = {{0.0, 45.0}, {5.0, 90.0}};
    kent_build b = pumped_main();
    b.model->surge_tanks[0].area = 0.2; /* fills soon */
    kent_build_law(&b, 1, KENT_EVENT_FIXED_LEVEL, 0, 0.0, rise, 2);
    kent_results *r = run(&b);
    bool told = false;
    for (size_t i = 0; i < r->cautions.count; i++) {
        told =
            told || strstr(r->cautions.text[i], "burst: surge tank \"ST\" overflows");
    }
    assert_true(told);
    assert_null(r->scenarios[0].devices[device_of(r, "ST")].caution);
    assert_non_null(r->scenarios[1].devices[device_of(r, "ST")].caution);
    kent_results_free(r);
    kent_build_clear(&b);
}

static void histories_have_columns_for_devices(void **state)
{
    (void)state;
    kent_build b = pumped_main();
    kent_results *r = run(&b);
    kent_text out = {0};
    assert_int_equal(kent_report_history_csv(r, 1, kent_mixed_sink(&out)), KENT_OK);
    const char *text = kent_text_of(&out);
    assert_non_null(strstr(text, ",PS.flow_m3s,PS.speed_rads,PS.torque_Nm,"));
    assert_non_null(strstr(text, ",VES.flow_m3s,VES.gas_volume_m3,"));
    assert_non_null(strstr(text, ",K1.burst.flow_m3s,K1.burst.area_m2,"));
    size_t commas[2] = {0, 0};
    for (size_t line = 0; line < 2; line++, text++) {
        for (; *text != '\n'; text++) {
            commas[line] += *text == ',' ? 1 : 0;
        }
    }
    assert_int_equal(commas[0], commas[1]);
    kent_text_clear(&out);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Two columns of one name would be read as one. */
static void a_device_called_as_its_point_has_columns_of_its_own(void **state)
{
    (void)state;
    kent_build b = pumped_main();
    (void)snprintf(b.model->air_vessels[0].id, KENT_ID, "PH");
    kent_results *r = run(&b);
    kent_text out = {0};
    assert_int_equal(kent_report_history_csv(r, 1, kent_mixed_sink(&out)), KENT_OK);
    const char *text = kent_text_of(&out);
    assert_non_null(
        strstr(text, ",PH.air-vessel.flow_m3s,PH.air-vessel.gas_volume_m3,"));
    const char *first = strstr(text, ",PH.flow_m3s,");
    assert_non_null(first);
    assert_null(strstr(first + 1, ",PH.flow_m3s,"));
    kent_text_clear(&out);
    kent_results_free(r);
    kent_build_clear(&b);
}

static const json_t *device_in(const json_t *root, size_t scenario, const char *id)
{
    size_t i = 0;
    const json_t *of = json_array_get(json_object_get(root, "scenarios"), scenario);
    const json_t *devices = json_object_get(of, "devices");
    for (i = 0; i < json_array_size(devices); i++) {
        const json_t *d = json_array_get(devices, i);
        if (strcmp(json_string_value(json_object_get(d, "id")), id) == 0) return d;
    }
    fail_msg("no device %s", id);
    return NULL;
}

static void results_tell_every_device_of_every_scenario(void **state)
{
    (void)state;
    kent_build b = pumped_main();
    kent_results *r = run(&b);
    kent_text out = {0};
    json_error_t bad;
    assert_int_equal(kent_report_json(r, kent_mixed_sink(&out)), KENT_OK);
    json_t *root = json_loads(kent_text_of(&out), 0, &bad);
    assert_non_null(root);
    const json_t *ves = device_in(root, 0, "VES");
    const kent_swing *want = &r->scenarios[0].devices[device_of(r, "VES")].told[0];
    const json_t *gas = json_object_get(ves, "gas_volume_m3");
    assert_string_equal(json_string_value(json_object_get(ves, "at")), "PH");
    assert_string_equal(json_string_value(json_object_get(ves, "kind")), "air vessel");
    assert_true(json_is_false(json_object_get(ves, "left_out")));
    assert_true(json_is_null(json_object_get(ves, "caution")));
    assert_true(json_number_value(json_object_get(gas, "highest")) == want->highest);
    assert_true(json_number_value(json_object_get(gas, "lowest_at_s")) ==
                want->lowest_at);
    const json_t *out_there = device_in(root, 1, "VES");
    assert_true(json_is_true(json_object_get(out_there, "left_out")));
    assert_true(json_is_null(
        json_object_get(json_object_get(out_there, "gas_volume_m3"), "highest")));
    const json_t *burst = device_in(root, 1, "K1.burst");
    assert_true(json_number_value(json_object_get(json_object_get(burst, "flow_m3s"),
                                                  "highest")) > 0.05);
    json_decref(root);
    kent_text_clear(&out);
    kent_results_free(r);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(extremes_are_those_of_the_history),
        cmocka_unit_test(a_tank_that_overflows_is_cautioned),
        cmocka_unit_test(histories_have_columns_for_devices),
        cmocka_unit_test(a_device_called_as_its_point_has_columns_of_its_own),
        cmocka_unit_test(results_tell_every_device_of_every_scenario),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
