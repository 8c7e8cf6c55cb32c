/* Load cases that a main is not held without, and a site test below the surge. */
#include "kent_build.h"
#include "kent_check.h"
#include "kent_job.h"

#include <math.h>
#include <stdlib.h>
#include <stdio.h>
#include <string.h>

static const double RHO_G = 1000.0 * 9.80665;

/* A tank at 60 m, 1 km down to a valve that discharges at 20 m and shuts at once; a
 * summit half-way. */
static kent_build a_main(bool scenario)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 30.0);
    kent_build_point(&b, "B", 500.0, 0.0, 45.0);
    kent_build_point(&b, "E", 900.0, 300.0, 20.0);
    kent_build_pipe(&b, "A", "R B E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", 60.0);
    const int valve = kent_build_valve(&b, "V", "E", 0.05, 20.0);
    if (scenario) {
        const int s = kent_build_scenario(&b, "shut", 10.0);
        kent_build_ramp(&b, s, KENT_EVENT_VALVE, valve, 0.5, 0.5, 0.0);
    }
    kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
    return b;
}

static kent_results *run(const kent_build *b)
{
    kent_error err = {0};
    kent_results *r = NULL;
    const kent_job_options options = {.threads = 1, .one_grid = true};
    if (kent_job_run(b->model, &options, &r, &err)) fail_msg("%s", err.what);
    return r;
}

static bool says(const kent_results *r, const char *words)
{
    for (size_t i = 0; i < r->cautions.count; i++) {
        if (strstr(r->cautions.text[i], words)) return true;
    }
    return false;
}

static void waive(kent_build *b, const char *what, const char *reason)
{
    b->model->waivers = calloc(1, sizeof *b->model->waivers);
    assert_non_null(b->model->waivers);
    b->model->waiver_count = 1;
    (void)snprintf(b->model->waivers[0].what, sizeof b->model->waivers[0].what, "%s",
                   what);
    (void)snprintf(b->model->waivers[0].reason, sizeof b->model->waivers[0].reason,
                   "%s", reason);
}

static void a_main_without_test_and_surge_is_not_complete(void **state)
{
    (void)state;
    kent_build b = a_main(false);
    kent_build_derive(&b);
    kent_results *r = run(&b);
    assert_true(r->incomplete);
    assert_true(r->completeness[KENT_NEEDS_STATIC].present);
    assert_false(r->completeness[KENT_NEEDS_TEST].present);
    assert_false(r->completeness[KENT_NEEDS_SURGE].present);
    assert_false(r->completeness[KENT_NEEDS_SHUT_OFF].asked); /* no pump */
    assert_true(says(r, "not complete: no site test"));
    assert_true(says(r, "or say why not by waived = ( ( \"test\", "));
    assert_true(says(r, "not complete: no scenario that decides"));
    assert_false(says(r, "not complete: pumps"));
    kent_results_free(r);
    kent_build_clear(&b);
}

static void it_is_with_both(void **state)
{
    (void)state;
    kent_build b = a_main(true);
    b.model->loads.test_pressure = 25e5;
    b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
    kent_build_derive(&b);
    kent_results *r = run(&b);
    assert_false(r->incomplete);
    assert_false(says(r, "not complete"));
    kent_results_free(r);
    kent_build_clear(&b);
}

static void one_for_comparison_does_not_count(void **state)
{
    (void)state;
    kent_build b = a_main(true);
    b.model->scenarios[0].for_comparison = true;
    kent_build_derive(&b);
    kent_results *r = run(&b);
    assert_false(r->completeness[KENT_NEEDS_SURGE].present);
    kent_results_free(r);
    kent_build_clear(&b);
}

static void what_is_waived_is_told_with_its_reason(void **state)
{
    (void)state;
    kent_build b = a_main(true);
    waive(&b, "test", "the main is not tested before it joins the old one");
    kent_build_derive(&b);
    kent_results *r = run(&b);
    assert_false(r->incomplete);
    assert_non_null(r->completeness[KENT_NEEDS_TEST].waived);
    assert_true(says(r, "done without the load case test: the main is not tested"));
    kent_results_free(r);
    kent_build_clear(&b);
}

static void pumps_bring_their_head_at_no_flow(void **state)
{
    (void)state;
    kent_build b = a_main(false);
    const int p = kent_build_pump(&b, "PS", "B", "E", 30.0, 0.1, 20.0);
    (void)p;
    kent_build_derive(&b);
    kent_results *r = run(&b);
    assert_true(r->completeness[KENT_NEEDS_SHUT_OFF].asked);
    assert_true(r->completeness[KENT_NEEDS_SHUT_OFF].present);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* The surge is highest above still water's slope at the valve. A test of 8 bar there,
 * 8 bar + 40 m at no place less: said, with the excess that the envelope shows. */
static void a_test_below_the_surge_is_told(void **state)
{
    (void)state;
    for (int high = 0; high < 2; high++) {
        kent_build b = a_main(true);
        b.model->loads.test_pressure = high ? 40e5 : 8e5;
        b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
        kent_build_derive(&b);
        kent_results *r = run(&b);
        const double test_head = (high ? 40e5 : 8e5) / RHO_G + 20.0;
        double highest = -INFINITY;
        for (int n = 0; n <= r->scenarios[0].grid->reaches[0]; n++) {
            highest = fmax(highest, r->scenarios[0].highest[0][n]);
        }
        assert_true((highest > test_head) == !high);
        assert_true(says(r, "the site test is below the surge: shut reaches") == !high);
        if (!high) assert_true(says(r, "where the test brings"));
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

/* EN 805, 11.3.2, from memory: 100 kPa above the highest of rest, steady flow and surge
 * anywhere, here of the surge at the low end: a plain loop over its envelope. */
static void the_en805_test_looks_at_the_whole_main(void **state)
{
    (void)state;
    kent_build b = a_main(true);
    b.model->loads.test_rule = KENT_TEST_EN805_CALCULATED;
    b.model->loads.test_gauge = kent_model_point_index(b.model, "B");
    kent_build_derive(&b);
    kent_results *r = run(&b);
    const kent_scenario_result *s = &r->scenarios[0];
    const kent_span *span = &b.model->spans[0];
    double highest = -INFINITY;
    for (int n = 0; n <= s->grid->reaches[0]; n++) {
        const double x = span->length * (double)n / (double)s->grid->reaches[0];
        const double z = kent_span_level(b.model, span, x);
        highest = fmax(highest, RHO_G * (s->highest[0][n] - z));
    }
    assert_close(r->loads->test.pressure, highest + 100e3, 1e-9);
    assert_false(r->loads->test.partial);
    kent_results_free(r);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_main_without_test_and_surge_is_not_complete),
        cmocka_unit_test(it_is_with_both),
        cmocka_unit_test(one_for_comparison_does_not_count),
        cmocka_unit_test(what_is_waived_is_told_with_its_reason),
        cmocka_unit_test(pumps_bring_their_head_at_no_flow),
        cmocka_unit_test(a_test_below_the_surge_is_told),
        cmocka_unit_test(the_en805_test_looks_at_the_whole_main),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
