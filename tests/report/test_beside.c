/* Limits, scenarios side by side, hand figures, devices and swings: what is printed and
 * what stands in results.json. Invented. */
#include "kent_mixed.h"

#include "kent_check.h"
#include "kent_limit_table.h"

#include <jansson.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* A pump trips, with a vessel and, to be set beside it, without. */
static kent_build pumped_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "PH", 0.0, 0.0, 5.0);
    kent_build_point(&b, "K1", 600.0, 0.0, 38.0);
    kent_build_point(&b, "R", 2000.0, 200.0, 30.0);
    kent_build_pipe(&b, "A", "PH K1", 0.4, 1000.0);
    kent_build_pipe(&b, "B", "K1 R", 0.4, 1000.0);
    for (int i = 0; i < 2; i++) {
        kent_pipe *p = &b.model->pipes[i];
        p->pressure_rating = i == 0 ? 10e5 : 6e5;
        p->plastic = true;
        (void)snprintf(p->material, sizeof p->material, "PVC-U");
        (void)snprintf(p->standard, sizeof p->standard, "ISO 1452-2:2009");
    }
    kent_build_fixed_level(&b, "R", 45.0);
    const int pump = kent_build_pump(&b, "PS", "PH", NULL, 70.0, 0.08, 50.0);
    b.model->pumps[pump].suction_level = 6.0;
    b.model->pumps[pump].check_valve = KENT_CHECK_IDEAL;
    kent_build_air_vessel(&b, "VES", "PH", 5.0, 2.0);
    const int trip = kent_build_scenario(&b, "trip", 30.0);
    kent_build_ramp(&b, trip, KENT_EVENT_PUMP, pump, 1.0, 0.0, 0.0);
    b.model->events[b.model->event_count - 1].action = KENT_TRIP;
    b.model->scenarios[trip].class_of = KENT_RECURRING;
    b.model->scenarios[trip].cycles_per_day = 2.0;
    b.model->asked.life = 10.0 * 365.0 * 86400.0;
    b.model->asked.lowest[KENT_RECURRING] = 0.0;
    const int bare = kent_build_scenario(&b, "bare", 30.0);
    kent_scenario *s = &b.model->scenarios[bare];
    s->event_first = b.model->scenarios[trip].event_first;
    s->event_count = 1;
    s->same_as = trip;
    s->class_of = KENT_RECURRING;
    s->for_comparison = true;
    b.model->without = kent_alloc(1, sizeof *b.model->without);
    assert_non_null(b.model->without);
    b.model->without[0] = (kent_left_out){KENT_DEVICE_AIR_VESSEL, 0};
    b.model->without_count = s->without_count = 1;
    const int note = kent_build_note(&b, "K1");
    b.model->notes[note].rating = 8e5;
    b.model->notes[note].surge_rating = b.model->notes[note].test_rating = 8e5;
    kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
    b.model->solver.grid_check = false;
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

static void assert_says(const char *text, const char *words)
{
    if (!strstr(text, words)) fail_msg("\"%s\" is not in:\n%s", words, text);
}

/* Lines of a text that hold some words. */
static size_t lines_with(const char *text, const char *words)
{
    size_t count = 0;
    for (const char *s = text; (s = strstr(s, words)) != NULL; s += strlen(words)) {
        count++;
    }
    return count;
}

static void the_worst_of_each_limit_is_printed_and_all_with_wide(void **state)
{
    (void)state;
    kent_build b = pumped_main();
    kent_results *r = run(&b);
    kent_text brief = {0}, wide = {0};
    kent_report_options o = {.units = KENT_SI};
    assert_int_equal(kent_report_tables(r, &o, kent_mixed_sink(&brief)), KENT_OK);
    o.wide = true;
    assert_int_equal(kent_report_tables(r, &o, kent_mixed_sink(&wide)), KENT_OK);
    const char *text = kent_text_of(&brief);
    assert_says(text, "Reached, and asked: the worst of each (--wide: all)\n");
    assert_says(text, "ISO 1452-2:2009");
    assert_says(text, "fitting, recurring");
    assert_says(text, "for comparison; ");
    assert_says(text, "nobody asks"); /* of steady flow */
    assert_null(strstr(text, "OK"));
    /* still water, steady flow, pumps at no flow: of two pipes one is worse; in wide
     * both stand there */
    assert_int_equal(lines_with(text, "pipe, service"), 3);
    assert_int_equal(lines_with(kent_text_of(&wide), "pipe, service"), 6);
    kent_text_clear(&brief);
    kent_text_clear(&wide);
    kent_results_free(r);
    kent_build_clear(&b);
}

static void what_is_passed_is_marked(void **state)
{
    (void)state;
    kent_build b = pumped_main();
    b.model->asked.lowest_steady = 2e5; /* 0.7 bar and less at K1 and R */
    kent_results *r = run(&b);
    kent_text out = {0};
    const kent_report_options o = {.units = KENT_US};
    assert_int_equal(kent_report_tables(r, &o, kent_mixed_sink(&out)), KENT_OK);
    assert_says(kent_text_of(&out), "≥ 29.0");
    assert_says(kent_text_of(&out), "!  beyond what is asked\n");
    assert_says(kent_text_of(&out), "of 1 ft/s");
    assert_true(r->limit_exceeded);
    kent_text_clear(&out);
    kent_results_free(r);
    kent_build_clear(&b);
}

static void a_scenario_stands_beside_the_one_it_repeats(void **state)
{
    (void)state;
    kent_build b = pumped_main();
    kent_results *r = run(&b);
    kent_text out = {0};
    const kent_report_options o = {.units = KENT_SI};
    assert_int_equal(kent_report_tables(r, &o, kent_mixed_sink(&out)), KENT_OK);
    const char *text = kent_text_of(&out);
    assert_says(text, "\nbare beside trip, bar\n");
    assert_says(text, "Left out of bare: VES.");
    assert_says(text, "\nDevices in trip\n");
    assert_says(text, "\nDevices in bare\n");
    assert_says(text, "air vessel VES  left out");
    assert_says(text, "gas volume");
    assert_says(text, "\nFor a hand check: not what was computed\n");
    assert_says(text, "can come out too low");
    assert_says(text, "\nSwings of plastic pipes by surges that recur\n");
    assert_says(text, "PVC-U A");
    assert_says(text, "7.3e+03"); /* 2 a day for 10 years of 365 days */
    assert_says(text, "the maker's cyclic design");
    kent_text_clear(&out);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Of a list of objects: the first whose key has this text. */
static const json_t *find(const json_t *list, const char *key, const char *text)
{
    for (size_t i = 0; i < json_array_size(list); i++) {
        const json_t *one = json_array_get(list, i);
        const char *value = json_string_value(json_object_get(one, key));
        if (value && strcmp(value, text) == 0) return one;
    }
    return NULL;
}

static double number(const json_t *of, const char *key)
{
    const json_t *value = json_object_get(of, key);
    assert_true(json_is_number(value));
    return json_number_value(value);
}

static void results_hold_the_same_with_every_digit(void **state)
{
    (void)state;
    kent_build b = pumped_main();
    kent_results *r = run(&b);
    kent_text out = {0};
    json_error_t bad;
    assert_int_equal(kent_report_json(r, kent_mixed_sink(&out)), KENT_OK);
    json_t *root = json_loads(kent_text_of(&out), 0, &bad);
    assert_non_null(root);

    const json_t *limits = json_object_get(root, "limits");
    assert_int_equal(json_array_size(limits), r->limit_count);
    for (size_t i = 0; i < r->limit_count; i++) {
        const json_t *l = json_array_get(limits, i);
        assert_true(number(l, "reached_Pa") == r->limits[i].reached);
        assert_int_equal(json_is_true(json_object_get(l, "exceeded")),
                         r->limits[i].exceeded);
        assert_int_equal(json_is_null(json_object_get(l, "asked_Pa")),
                         isnan(r->limits[i].asked));
    }
    const json_t *fitting = find(limits, "fitting", "K1");
    assert_non_null(fitting);
    assert_true(json_is_null(json_object_get(fitting, "pipe")));
    const json_t *compared = find(limits, "scenario", "bare");
    assert_true(json_is_true(json_object_get(compared, "for_comparison")));

    const json_t *twins = json_array_get(json_object_get(root, "twins"), 0);
    assert_string_equal(json_string_value(json_object_get(twins, "beside")), "trip");
    const json_t *head = find(json_object_get(twins, "places"), "at", "PH");
    const json_t *lowest = json_object_get(head, "lowest_Pa");
    for (int k = 0; k < 2; k++) { /* the one it repeats first */
        const double want =
            kent_model_pressure(b.model, r->scenarios[k].points[0].lowest_head, 5.0);
        assert_true(json_number_value(json_array_get(lowest, (size_t)k)) == want);
    }
    const json_t *trip = find(json_object_get(root, "scenarios"), "id", "trip");
    const json_t *screen = find(json_object_get(trip, "screening"), "id", "PS");
    assert_true(number(screen, "sudden_Pa") > number(screen, "march_fall_Pa"));
    const json_t *swing = find(json_object_get(trip, "swings"), "pipe", "A");
    assert_close(number(swing, "cycles"), 7300.0, 1e-12);
    json_decref(root);
    kent_text_clear(&out);
    kent_results_free(r);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_worst_of_each_limit_is_printed_and_all_with_wide),
        cmocka_unit_test(what_is_passed_is_marked),
        cmocka_unit_test(a_scenario_stands_beside_the_one_it_repeats),
        cmocka_unit_test(results_hold_the_same_with_every_digit),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
