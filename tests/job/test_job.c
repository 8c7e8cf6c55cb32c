#include "kent_build.h"
#include "kent_check.h"
#include "kent_job.h"

#include <stdio.h>
#include <string.h>

/* A gravity main 1 km long from a tank at 60 m to a valve that discharges at 20 m, with
 * a bend half-way: shut in 2 s and in 20 s. */
static kent_build main_with_two_closures(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 30.0);
    kent_build_point(&b, "B", 500.0, 0.0, 25.0);
    kent_build_point(&b, "E", 900.0, 300.0, 20.0);
    kent_build_pipe(&b, "A", "R B E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", 60.0);
    const int valve = kent_build_valve(&b, "V", "E", 0.05, 20.0);
    const int fast = kent_build_scenario(&b, "fast", 20.0);
    kent_build_ramp(&b, fast, KENT_EVENT_VALVE, valve, 0.5, 2.0, 0.0);
    const int slow = kent_build_scenario(&b, "slow", 30.0);
    kent_build_ramp(&b, slow, KENT_EVENT_VALVE, valve, 0.5, 20.0, 0.0);
    kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
    return b;
}

static kent_results *run(const kent_build *b, const kent_job_options *options)
{
    kent_error err = {0};
    kent_results *r = NULL;
    const kent_status status = kent_job_run(b->model, options, &r, &err);
    if (status) fail_msg("%s: %s", err.where, err.what);
    return r;
}

static bool a_caution_holds(const kent_notes *notes, const char *words)
{
    for (size_t i = 0; i < notes->count; i++) {
        if (strstr(notes->text[i], words)) return true;
    }
    return false;
}

static void the_same_bits_come_whatever_the_number_of_threads(void **state)
{
    (void)state;
    kent_build b = main_with_two_closures();
    kent_build_derive(&b);
    kent_results *one = run(&b, &(kent_job_options){.threads = 1});
    kent_results *four = run(&b, &(kent_job_options){.threads = 4});
    assert_int_equal(one->scenario_count, 2);
    for (size_t s = 0; s < 2; s++) {
        const kent_scenario_result *x = &one->scenarios[s], *y = &four->scenarios[s];
        const size_t bytes = b.model->point_count * sizeof *x->points;
        assert_memory_equal(x->points, y->points, bytes);
        assert_int_equal(x->history.rows, y->history.rows);
        assert_memory_equal(x->history.head, y->history.head,
                            x->history.rows * x->history.watch_count * sizeof(double));
    }
    const kent_load_case *x = one->loads->fittings[0].cases;
    const kent_load_case *y = four->loads->fittings[0].cases;
    for (size_t c = 0; c < one->loads->fittings[0].count; c++) {
        assert_memory_equal(&x[c].worst[KENT_RESULTANT].balance.thrust,
                            &y[c].worst[KENT_RESULTANT].balance.thrust,
                            sizeof(kent_vec3));
    }
    kent_results_free(one);
    kent_results_free(four);
    kent_build_clear(&b);
}

static void a_peak_is_the_highest_of_its_history(void **state)
{
    (void)state;
    kent_build b = main_with_two_closures();
    kent_build_derive(&b);
    kent_results *r = run(&b, &(kent_job_options){.threads = 1});
    for (size_t s = 0; s < r->scenario_count; s++) {
        const kent_history *h = &r->scenarios[s].history;
        assert_true(h->rows > 100);
        for (size_t c = 0; c < r->history_count; c++) {
            double highest = -1e9, lowest = 1e9;
            for (size_t i = 0; i < h->rows; i++) {
                highest = fmax(highest, h->head[i * h->watch_count + c]);
                lowest = fmin(lowest, h->head[i * h->watch_count + c]);
            }
            const kent_peak *peak = &r->scenarios[s].points[r->history_points[c]];
            assert_true(highest == peak->highest_head && lowest == peak->lowest_head);
        }
    }
    kent_results_free(r);
    kent_build_clear(&b);
}

static void
a_faster_closure_gives_the_higher_peak_and_both_stay_below_joukowsky(void **state)
{
    (void)state;
    kent_build b = main_with_two_closures();
    kent_build_derive(&b);
    kent_results *r = run(&b, &(kent_job_options){.threads = 1});
    const int end = kent_model_point_index(b.model, "E");
    const double fast = r->scenarios[0].points[end].highest_head;
    const double slow = r->scenarios[1].points[end].highest_head;
    const double speed = r->steadies[0]->span_flow[0] / b.model->spans[0].area;
    const double joukowsky = 1000.0 * speed / b.model->gravity; /* m, a V/g */
    assert_true(slow > 60.0 && fast > slow);
    assert_true(fast <= r->steadies[0]->node_head[0] + joukowsky + 1e-9);
    assert_true(r->scenarios[0].uncertainty >= 0.0 &&
                r->scenarios[0].uncertainty < 1.0);
    kent_results_free(r);
    kent_build_clear(&b);
}

static void a_fitting_below_the_vapour_limit_says_so(void **state)
{
    (void)state;
    kent_build b = main_with_two_closures();
    b.model->points[1].at.z = 75.0; /* a crest far above the levels at both ends */
    kent_build_derive(&b);
    kent_results *r = run(&b, &(kent_job_options){.threads = 1});
    const int crest = kent_build_fitting_of(&b, "B");
    assert_true(r->limit_exceeded);
    assert_true(a_caution_holds(&r->cautions, "are switched off"));
    assert_true(r->scenarios[0].touched[1]);
    assert_int_equal(r->scenarios[0].cavity_count, 0);
    assert_true(
        a_caution_holds(&r->restraints->fittings[crest].cautions, "vapour limit"));
    kent_results_free(r);
    b.model->solver.column_separation = KENT_SEPARATION_GAS;
    r = run(&b, &(kent_job_options){.threads = 1});
    assert_true(a_caution_holds(&r->cautions, "before anything happens"));
    kent_results_free(r);
    kent_build_clear(&b);

    const int slow = 1;
    b = main_with_two_closures();
    kent_build_derive(&b);
    r = run(&b,
            &(kent_job_options){.scenarios = &slow, .scenario_count = 1, .threads = 1});
    assert_false(
        a_caution_holds(&r->restraints->fittings[crest].cautions, "vapour limit"));
    kent_results_free(r);
    kent_build_clear(&b);
}

static void a_rating_that_is_passed_is_said_and_sets_the_limit(void **state)
{
    (void)state;
    kent_build b = main_with_two_closures();
    b.model->pipes[0].pressure_rating = 5e5; /* Pa */
    kent_build_derive(&b);
    kent_results *r = run(&b, &(kent_job_options){.threads = 1});
    assert_true(a_caution_holds(&r->cautions, "pipe A"));
    assert_true(r->limit_exceeded);
    kent_results_free(r);

    b.model->pipes[0].pressure_rating = 50e5;
    r = run(&b, &(kent_job_options){.threads = 1});
    assert_false(a_caution_holds(&r->cautions, "pipe A"));
    kent_results_free(r);
    kent_build_clear(&b);
}

/* 40 m of water over E, 3.9 bar, and no scenario at all. */
static void a_rating_is_held_against_water_at_rest_too(void **state)
{
    (void)state;
    kent_build b = main_with_two_closures();
    kent_build_derive(&b);
    const int none = 0;
    b.model->pipes[0].pressure_rating = 3.8e5; /* Pa */
    kent_results *r = run(&b, &(kent_job_options){.scenarios = &none, .threads = 1});
    assert_int_equal(r->scenario_count, 0);
    assert_true(a_caution_holds(&r->cautions, "at E in static"));
    assert_true(r->limit_exceeded);
    kent_results_free(r);

    b.model->pipes[0].pressure_rating = 4.0e5;
    r = run(&b, &(kent_job_options){.scenarios = &none, .threads = 1});
    assert_false(a_caution_holds(&r->cautions, "at E in static"));
    kent_results_free(r);
    kent_build_clear(&b);
}

static void a_peak_at_the_very_end_asks_for_a_longer_run(void **state)
{
    (void)state;
    kent_build b = main_with_two_closures();
    b.model->scenarios[1].duration = 5.0; /* s: the slow valve is still moving */
    kent_build_derive(&b);
    const int slow = 1;
    kent_results *r = run(
        &b, &(kent_job_options){.scenarios = &slow, .scenario_count = 1, .threads = 1});
    assert_int_equal(r->scenario_count, 1);
    assert_true(a_caution_holds(&r->cautions, "run it longer"));
    kent_results_free(r);
    kent_build_clear(&b);
}

/* Stubs of 5 m, 6 m ... beside 2 km: one sentence names them, and the wave speed that
 * is moved most, the shortest's. */
static void short_spans_are_named_in_one_sentence(void **state)
{
    (void)state;
    for (int stubs = 1; stubs <= 7; stubs += 6) {
        kent_build b = kent_build_new();
        kent_error err = {0};
        kent_results *r = NULL;
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "J", 2000.0, 0.0, 0.0);
        kent_build_pipe(&b, "A", "R J", 0.5, 1000.0);
        kent_build_fixed_level(&b, "R", 60.0);
        for (int i = 1; i <= stubs; i++) {
            char id[8], pipe[8], route[16];
            (void)snprintf(id, sizeof id, "D%d", i);
            (void)snprintf(pipe, sizeof pipe, "S%d", i);
            (void)snprintf(route, sizeof route, "J D%d", i);
            kent_build_point(&b, id, 2000.0 + 4.0 + i, 0.0, 0.0);
            kent_build_pipe(&b, pipe, route, 0.1, 1000.0);
            kent_build_outflow(&b, id, 0.002);
        }
        kent_build_ramp(&b, kent_build_scenario(&b, "stop", 10.0), KENT_EVENT_OUTFLOW,
                        0, 0.0, 2.0, 0.0);
        b.model->solver.grid_check = false;
        kent_build_derive(&b);
        if (kent_job_run(b.model, &(kent_job_options){.threads = 1}, &r, &err)) {
            fail_msg("%s: %s", err.where, err.what);
        }
        size_t said = 0;
        const char *text = "";
        for (size_t i = 0; i < r->cautions.count; i++) {
            if (!strstr(r->cautions.text[i], "fit the common step")) continue;
            text = r->cautions.text[i];
            said++;
        }
        assert_int_equal(said, 1);
        if (stubs == 1) {
            assert_non_null(strstr(text, "span S1 does not fit the common step: the "
                                         "wave speed 1000 m/s is marched as "));
        } else {
            assert_non_null(strstr(text, "spans S1, S2, S3, S4, S5, S6 and 1 more do "
                                         "not fit"));
            assert_non_null(strstr(text, "1000 m/s of S1 is marched as "));
        }
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

static void a_sheet_of_ports_runs_without_a_network(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    const kent_port end = kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, 1e6, 0.0, 0.3);
    kent_build_ports(&b, "CAP", -1, &end, 1);
    kent_build_derive(&b);
    kent_results *r = run(&b, &(kent_job_options){.threads = 1});
    assert_int_equal(r->loads->fittings[0].count, 1);
    const kent_vec3 thrust =
        r->loads->fittings[0].cases[0].worst[KENT_RESULTANT].balance.thrust;
    assert_close(thrust.x, 1e6 * acos(-1.0) / 4.0 * 0.09, 1e-12); /* N, p A */
    kent_results_free(r);
    kent_build_clear(&b);
}

/* A crest that the fast closure empties: the run says so, the fitting there, and the
 * fittings whose peak comes of its closing. */
static void a_fitting_where_the_water_parts_says_so(void **state)
{
    (void)state;
    static const kent_separation MODELS[] = {KENT_SEPARATION_VAPOUR,
                                             KENT_SEPARATION_GAS};
    for (size_t i = 0; i < 2; i++) {
        kent_build b = main_with_two_closures();
        b.model->points[1].at.z = 60.0;
        b.model->solver.column_separation = MODELS[i];
        kent_build_derive(&b);
        kent_results *r = run(&b, &(kent_job_options){.threads = 1});
        const kent_scenario_result *fast = &r->scenarios[0];
        const int crest = kent_build_fitting_of(&b, "B");
        assert_true(fast->cavity_count > 0 && fast->below_vapour == 0);
        assert_true(fast->hollow[1] > 0.0);
        assert_true(fast->hollow[1] <= fast->cavities[0].largest);
        assert_true(r->limit_exceeded);
        assert_true(a_caution_holds(&r->cautions, "the water parts at or next to"));
        assert_true(a_caution_holds(&r->restraints->fittings[crest].cautions,
                                    "the water parts at or next to it"));
        kent_results_free(r);
        kent_build_clear(&b);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_same_bits_come_whatever_the_number_of_threads),
        cmocka_unit_test(a_peak_is_the_highest_of_its_history),
        cmocka_unit_test(
            a_faster_closure_gives_the_higher_peak_and_both_stay_below_joukowsky),
        cmocka_unit_test(a_fitting_below_the_vapour_limit_says_so),
        cmocka_unit_test(a_fitting_where_the_water_parts_says_so),
        cmocka_unit_test(a_rating_that_is_passed_is_said_and_sets_the_limit),
        cmocka_unit_test(a_rating_is_held_against_water_at_rest_too),
        cmocka_unit_test(a_peak_at_the_very_end_asks_for_a_longer_run),
        cmocka_unit_test(short_spans_are_named_in_one_sentence),
        cmocka_unit_test(a_sheet_of_ports_runs_without_a_network),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
