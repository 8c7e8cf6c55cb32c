/* What pipes pull, slide and are pushed along themselves with, from the job to what is
 * printed. Invented. */
#include "kent_check.h"
#include "kent_mixed.h"
#include "kent_shown.h"
#include "kent_worked.h"

#include <jansson.h>
#include <math.h>
#include <string.h>

/* R ==== P ~~~~ B ~~~~ Q ---- H \\\\ E: fused polyethylene, welded steel on supports
 * with a turn, and socketed iron down a hill; a valve at its foot shuts. */
static kent_build along(void)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    (void)kent_build_point(&b, "P", 300.0, 0.0, 0.0);
    (void)kent_build_point(&b, "B", 400.0, 0.0, 0.0);
    (void)kent_build_point(&b, "Q", 400.0, 60.0, 0.0);
    (void)kent_build_point(&b, "H", 400.0, 200.0, 0.0);
    (void)kent_build_point(&b, "E", 400.0, 300.0, -40.0);
    const int pe = kent_build_pipe(&b, "pe", "R P", 0.30, 300.0);
    const int steel = kent_build_pipe(&b, "bridge", "P B Q", 0.30, 1000.0);
    const int iron = kent_build_pipe(&b, "hill", "Q H E", 0.30, 1000.0);
    kent_pipe *p = b.model->pipes;
    p[pe].joint = KENT_FUSED;
    p[pe].plastic = true;
    p[pe].poisson = 0.45;
    p[pe].modulus = 1e9;
    p[pe].long_modulus = 2e8;
    p[pe].expansion = 1.8e-4;
    p[pe].material_density = 955.0;
    p[steel].joint = KENT_WELDED;
    p[steel].above_ground = true;
    p[steel].poisson = 0.3;
    p[steel].modulus = 207e9;
    p[steel].expansion = 1.2e-5;
    p[steel].material_density = 7850.0;
    p[iron].material_density = 7050.0;
    p[iron].laying_length = 6.0;
    kent_build_fixed_level(&b, "R", 80.0);
    const int valve = kent_build_valve(&b, "V", "E", 0.02, -40.0);
    const int shut = kent_build_scenario(&b, "shut", 4.0);
    kent_build_ramp(&b, shut, KENT_EVENT_VALVE, valve, 0.0, 0.0, 0.05);
    const int s = kent_build_soil(&b, "sand", 100e3, 19e3, 1.2);
    b.model->soils[s].friction_angle = 32.0 * 3.14159265358979323846 / 180.0;
    b.model->soils[s].cohesion = 0.0;
    b.model->soils[s].friction_ratio = 0.7;
    b.model->soils[s].adhesion_ratio = 0.0;
    b.model->soils[s].passive_ratio = 0.5;
    b.model->loads.test_pressure = 16e5;
    b.model->loads.cooling = 12.0;
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

static double number(const json_t *of, const char *key)
{
    const json_t *n = json_object_get(of, key);
    if (!json_is_number(n)) fail_msg("no number %s", key);
    return json_number_value(n);
}

static json_t *results_of(const kent_results *r)
{
    kent_text out = {0};
    json_error_t bad;
    assert_int_equal(kent_report_json(r, kent_mixed_sink(&out)), KENT_OK);
    json_t *root = json_loads(kent_text_of(&out), 0, &bad);
    assert_non_null(root);
    kent_text_clear(&out);
    return root;
}

static void every_run_has_its_row(void **state)
{
    (void)state;
    kent_build b = along();
    kent_results *r = run(&b);
    const kent_report_options o = {.units = KENT_SI};
    kent_text out = {0};
    assert_int_equal(r->loads->run_count, 2);
    assert_int_equal(kent_report_tables(r, &o, kent_mixed_sink(&out)), KENT_OK);
    const char *table = strstr(kent_text_of(&out), "run above ground");
    assert_non_null(table);
    const char *row = strstr(table, "P > B");
    assert_non_null(row);
    const char *end = strchr(row, '\n');
    assert_non_null(end);
    for (int forward = 0; forward < 2; forward++) {
        const kent_run_worst at = kent_run_most(r->model, &r->loads->runs[0], forward);
        const kent_shown want =
            kent_shown_quantity(KENT_FORCE, KENT_SI, fabs(at.force));
        assert_true(fabs(at.force) > 1e3);
        const char *found = strstr(row, want.text);
        assert_true(found && found < end);
    }
    assert_non_null(strstr(table, "B > Q"));
    kent_text_clear(&out);
    kent_results_free(r);
    kent_build_clear(&b);
}

static void every_run_has_its_history(void **state)
{
    (void)state;
    kent_build b = along();
    kent_results *r = run(&b);
    json_t *root = results_of(r);
    const json_t *runs = json_object_get(root, "runs");
    assert_int_equal(json_array_size(runs), 2);
    for (size_t i = 0; i < 2; i++) {
        const json_t *it = json_array_get(runs, i);
        const json_t *march = json_array_get(json_object_get(it, "marches"), 0);
        const json_t *forces = json_object_get(march, "history_force_N");
        const kent_run *want = &r->loads->runs[i];
        double most = 0.0;
        assert_close(number(it, "length_m"), want->length, 1e-12);
        for (size_t k = 0; k < json_array_size(forces); k++) {
            most = fmax(most, json_number_value(json_array_get(forces, k)));
        }
        assert_true(json_array_size(forces) > 10);
        assert_close(number(json_object_get(march, "highest"), "force_N"),
                     kent_run_most(r->model, want, true).force, 1e-12);
        assert_close(most, kent_run_most(r->model, want, true).force, 1e-12);
        assert_close(number(json_object_get(march, "lowest"), "force_N"),
                     kent_run_most(r->model, want, false).force, 1e-12);
    }
    json_decref(root);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* The string goes on from polyethylene into steel, and ends at Q, in plain pipe. */
static void every_end_and_steep_stretch_is_in_the_results(void **state)
{
    (void)state;
    kent_build b = along();
    kent_results *r = run(&b);
    json_t *root = results_of(r);
    const json_t *pulls = json_object_get(root, "pulls");
    const json_t *ends = json_object_get(pulls, "ends");
    const json_t *steeps = json_object_get(pulls, "steep");
    assert_int_equal(json_array_size(ends), 2);
    const json_t *end = json_array_get(ends, 1);
    const double sum = number(end, "of_pressure_N") + number(end, "of_end_face_N") +
                       number(end, "of_cooling_N") + number(end, "of_string_N");
    assert_string_equal(json_string_value(json_object_get(end, "at")), "Q");
    assert_close(number(end, "pull_N"), sum, 1e-12);
    assert_close(number(end, "design_pull_N"), sum * number(end, "safety_factor"),
                 1e-12);
    assert_int_equal(json_array_size(steeps), 1);
    assert_close(number(json_array_get(steeps, 0), "anchor_N"),
                 r->restraints->pulls.steeps[0].anchor_force, 1e-12);
    json_decref(root);
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Of the tank's end, at no fitting, and of the hill; worked out again from what is
 * printed. */
static void what_stands_at_no_fitting_is_explained_too(void **state)
{
    (void)state;
    kent_build b = along();
    kent_results *r = run(&b);
    for (int us = 0; us < 2; us++) {
        const kent_report_options o = {.units = us ? KENT_US : KENT_SI};
        kent_text out = {0};
        assert_int_equal(kent_report_explain_along(r, &o, kent_mixed_sink(&out)),
                         KENT_OK);
        const char *text = kent_text_of(&out);
        assert_non_null(strstr(text, "at its end at R"));
        assert_non_null(strstr(text, "the wall there must be made for"));
        assert_non_null(strstr(text, "Pipe \"hill\" on steep ground"));
        assert_true(kent_worked_check(text) > 10);
        kent_text_clear(&out);
    }
    kent_results_free(r);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_run_has_its_row),
        cmocka_unit_test(every_run_has_its_history),
        cmocka_unit_test(every_end_and_steep_stretch_is_in_the_results),
        cmocka_unit_test(what_stands_at_no_fitting_is_explained_too),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
