/* Mains with devices marched: what must hold whatever stands there. Each device's own
 * behaviour is in its own test. */
#include "kent_stands_internal.h"

#include "ledger.h"
#include "march.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* ---- a main with everything ------------------------------------------------------ */

/* A pump from a sump, a vessel and a relief valve behind it; a pressure reducing valve
 * and a check valve in line; tanks, an air valve at a crest beside a valve in line, a
 * vessel where water is drawn. Invented. */
static kent_build everything(kent_surge_friction friction)
{
    static const struct {
        const char *id;
        double x, z;
    } point[] = {{"P", 0, 10},    {"A", 800, 20},  {"B", 1500, 35},
                 {"C", 2300, 45}, {"D", 3100, 30}, {"E", 3900, 12},
                 {"F", 4600, 25}, {"R", 5400, 40}, {"X", 2301, 45}};
    kent_build b = kent_build_new();
    for (size_t i = 0; i < sizeof point / sizeof point[0]; i++) {
        const double y = point[i].id[0] == 'X' ? 700.0 : 0.0;
        kent_build_point(&b, point[i].id, point[i].x, y, point[i].z);
    }
    static const char *const route[] = {"P A", "A B", "B C", "C D",
                                        "D E", "E F", "F R", "B X"};
    for (size_t i = 0; i < sizeof route / sizeof route[0]; i++) {
        const int p = kent_build_pipe(&b, route[i], route[i], 0.4, 1000.0);
        b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
        b.model->pipes[p].friction_coefficient = 0.0002;
    }
    const int pump = kent_build_pump(&b, "PS", "P", NULL, 95.0, 0.12, 75.0);
    b.model->pumps[pump].suction_level = 12.0;
    b.model->pumps[pump].in_parallel = 2;
    b.model->pumps[pump].check_valve = KENT_CHECK_IDEAL;
    b.model->pumps[pump].check_loss = 50.0;
    kent_build_air_vessel(&b, "VES", "P", 8.0, 3.0);
    kent_build_relief_valve(&b, "RV", "P", 12e5, 0.02);
    kent_build_surge_tank(&b, "ST", "A", 6.0);
    kent_build_one_way_tank(&b, "FT", "B", 10.0, 45.0);
    kent_build_check_valve(&b, "NR", "D", "E");
    const int vw = kent_build_valve(&b, "VW", "C", 0.3, (double)NAN);
    kent_build_air_valve(&b, "AV", "C", 0.1, 0.01);
    b.model->air_valves[0].next_to = kent_model_point_index(b.model, "D");
    kent_build_control_valve(&b, "PR", "F", "R", KENT_HOLDS_DOWNSTREAM, 2.5e5);
    kent_build_fixed_level(&b, "R", 42.0);
    kent_build_outflow(&b, "E", 0.03);
    kent_build_air_vessel(&b, "VE", "E", 2.0, 0.5);
    const int out = kent_build_outflow(&b, "X", 0.01);
    const int s = kent_build_scenario(&b, "trip", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_PUMP, pump, 0.5, 0.0, 0.0);
    b.model->events[b.model->event_count - 1].action = KENT_TRIP;
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, vw, 2.0, 5.0, 0.3);
    kent_build_ramp(&b, s, KENT_EVENT_OUTFLOW, out, 4.0, 1.0, 0.0);
    b.model->solver.friction = friction;
    b.model->solver.min_reaches = 4;
    return b;
}

static double largest_swing(const march *m)
{
    double worst = 0.0; /* m */
    for (size_t s = 0; s < m->build->model->span_count; s++) {
        const size_t n = (size_t)m->grid->reaches[s] + 1;
        double *high = kent_alloc(2 * n, sizeof *high), *low = high + n;
        assert_non_null(high);
        kent_marcher_envelope(m->marcher, (int)s, high, low);
        for (size_t i = 0; i < n; i++) {
            worst = fmax(worst, high[i] - low[i]);
        }
        free(high);
    }
    return worst;
}

static void without_an_event_nothing_changes(void **state)
{
    (void)state;
    for (int i = 0; i < 2; i++) {
        kent_build b =
            everything(i == 0 ? KENT_SURGE_CONSTANT : KENT_SURGE_QUASI_STEADY);
        march m = march_new(&b, 60.0, -1, NULL, 0, 1000);
        kent_trace trace;
        kent_error err = {0};
        static kent_device_row first[16];
        assert_in_range(b.model->device_count, 9, 16);
        for (int n = 0; n < 100; n++) {
            if (kent_marcher_advance(m.marcher, 1000, &trace, &err) != 1000) {
                fail_msg("%s", err.what);
            }
            if (n > 0) continue;
            memcpy(first, trace.devices, trace.device_count * sizeof *first);
        }
        print_message("heads stray by %g m over 1e5 steps\n", largest_swing(&m));
        assert_within(largest_swing(&m), 0.0, 1e-9);
        for (size_t d = 0; d < trace.device_count; d++) {
            assert_within(trace.devices[d].flow, first[d].flow, 1e-9);
            assert_within(first[d].flow, m.steady->device_flow[d], 1e-12);
        }
        march_clear(&m);
        kent_build_clear(&b);
    }
}

/* Every head and flow after 20 s of the scenario, and the last row of devices. */
static void after_20_s(kent_marcher *k, const march *m, double **all, size_t *count)
{
    const kent_model *model = m->build->model;
    kent_trace trace;
    kent_error err = {0};
    do {
        if (kent_marcher_advance(k, 1, &trace, &err) != 1) fail_msg("%s", err.what);
    } while (trace.time[0] < 20.0);
    *count = 2 * m->grid->node_total + model->device_count;
    *all = kent_alloc(*count, sizeof **all);
    assert_non_null(*all);
    double *to = *all;
    for (size_t s = 0; s < model->span_count; s++) {
        const size_t n = (size_t)m->grid->reaches[s] + 1;
        kent_marcher_profile(k, (int)s, to, to + n);
        to += 2 * n;
    }
    for (size_t d = 0; d < model->device_count; d++) {
        *to++ = trace.devices[d].flow;
    }
}

static void the_same_bits_come_again_with_every_kernel(void **state)
{
    (void)state;
    static const char *const level[] = {"base", "avx2", "avx512", "base"};
    kent_build b = everything(KENT_SURGE_QUASI_STEADY);
    march m = march_new(&b, 60.0, 0, NULL, 0, 1);
    double *want = NULL, *got = NULL;
    size_t count = 0;
    after_20_s(m.marcher, &m, &want, &count);
    for (size_t i = 0; i < sizeof level / sizeof level[0]; i++) {
        kent_marcher *k = NULL;
        kent_error err = {0};
        assert_int_equal(setenv("KENTLEDGE_SIMD", level[i], 1), 0);
        if (kent_marcher_new(b.model, m.steady, m.grid, 0, NULL, 0, 1, &k, &err)) {
            print_message("not compared: %s\n", err.what);
            continue;
        }
        after_20_s(k, &m, &got, &count);
        assert_memory_equal(got, want, count * sizeof *got);
        free(got);
        kent_marcher_free(k);
    }
    assert_int_equal(unsetenv("KENTLEDGE_SIMD"), 0);
    free(want);
    march_clear(&m);
    kent_build_clear(&b);
}

/* A vessel at the point where an outflow stops, left out (without 1) or never there
 * (without 2). */
static double *stopped_main(int without, size_t *count)
{
    const kent_left_out vessel = {KENT_DEVICE_AIR_VESSEL, 0};
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "J", 700.0, 0.0, 0.0);
    kent_build_point(&b, "E", 1500.0, 0.0, 0.0);
    kent_build_pipe(&b, "1", "R J", 0.4, 1000.0);
    kent_build_pipe(&b, "2", "J E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 60.0);
    if (without < 2) kent_build_air_vessel(&b, "VES", "J", 2.0, 0.3);
    const int o = kent_build_outflow(&b, "E", 0.08);
    const int s = kent_build_scenario(&b, "stop", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_OUTFLOW, o, 0.5, 1.0, 0.0);
    b.model->solver.friction = KENT_SURGE_NONE;
    march m = march_new(&b, 60.0, -1, NULL, 0, 1);
    double *all = NULL;
    if (without == 1) {
        b.model->without = kent_alloc(1, sizeof vessel);
        assert_non_null(b.model->without);
        b.model->without[0] = vessel;
        b.model->without_count = b.model->scenarios[s].without_count = 1;
    }
    kent_marcher *k = march_marcher(&m, s, NULL, 0, 1);
    kent_trace trace;
    kent_error err = {0};
    assert_int_equal(kent_marcher_advance(k, 1, &trace, &err), 1);
    if (without == 1) {
        assert_true(trace.devices[0].flow == 0.0 && isnan(trace.devices[0].told[0]));
    }
    after_20_s(k, &m, &all, count);
    *count -= b.model->device_count;
    kent_marcher_free(k);
    march_clear(&m);
    kent_build_clear(&b);
    return all;
}

static void what_is_left_out_might_never_have_been_there(void **state)
{
    (void)state;
    size_t count[3] = {0, 0, 0};
    double *with = stopped_main(0, &count[0]), *without = stopped_main(1, &count[1]),
           *never = stopped_main(2, &count[2]);
    assert_true(count[0] == count[1] && count[1] == count[2]);
    assert_memory_equal(without, never, count[1] * sizeof *never);
    assert_memory_not_equal(with, never, count[1] * sizeof *never);
    free(with);
    free(without);
    free(never);
}

/* ---- where the march must stop --------------------------------------------------- */

static void expect_stop(kent_marcher *k, const char *text, const char *more)
{
    kent_trace trace;
    kent_error err = {0}, again = {0};
    while (kent_marcher_advance(k, 1, &trace, &err) == 1) {
        assert_true(trace.time[0] < 60.0);
    }
    print_message("%s\n", err.what);
    assert_int_equal(err.status, KENT_E_SOLVE);
    assert_non_null(strstr(err.what, text));
    assert_non_null(strstr(err.what, more));
    assert_int_equal(kent_marcher_advance(k, 1, &trace, &again), 0);
    assert_string_equal(again.what, err.what);
}

static void what_a_device_cannot_do_stops_the_march(void **state)
{
    (void)state;
    kent_build b = everything(KENT_SURGE_CONSTANT);
    march m = march_new(&b, 60.0, 0, NULL, 0, 1);
    kent_surge_tank *tank = &b.model->surge_tanks[0];
    tank->bottom_level = m.steady->node_head[tank->node] - 0.05; /* nearly empty */
    kent_marcher *k = march_marcher(&m, 0, NULL, 0, 1);
    expect_stop(k, "surge tank \"ST\" is empty", "(after ");
    kent_marcher_free(k);
    march_clear(&m);
    kent_build_clear(&b);
}

/* No law of a real device has no answer: one that has none is put in its place. */
static kent_device_law never(const kent_device_state *s, double q, const double h[2])
{
    (void)s;
    (void)h;
    return (kent_device_law){3.0 + 1e-9 * q / (1.0 + fabs(q)), 0.0, {0.0, 0.0}};
}

static void what_has_no_answer_is_said_with_place_and_time(void **state)
{
    (void)state;
    const kent_device_ops bad = {.law = never};
    kent_build b = everything(KENT_SURGE_CONSTANT);
    march m = march_new(&b, 60.0, 0, NULL, 0, 1);
    kent_error err = {0};
    kent_waves *w = NULL;
    kent_ends *e = NULL;
    bool implicit[16] = {false};
    assert_in_range(b.model->span_count, 1, 16);
    assert_int_equal(kent_waves_new(b.model, m.grid, implicit, &w, &err), KENT_OK);
    assert_int_equal(kent_ends_new(b.model, m.steady, w, 0, &e, &err), KENT_OK);
    e->stands->time = 1.5;
    e->stands->members[kent_model_device_index(b.model, "VES")]->ops = &bad;
    kent_ends_solve(e, w);
    assert_int_equal(e->stands->stopped.status, KENT_E_SOLVE);
    assert_non_null(strstr(e->stands->stopped.what, "point P after 1.5 s"));
    assert_non_null(strstr(e->stands->stopped.what, "VES misses its law by 3 m"));
    kent_ends_free(e);
    kent_waves_free(w);
    march_clear(&m);
    kent_build_clear(&b);
}

/* ---- mains at random ------------------------------------------------------------- */

static uint64_t seed;

static double chance(double low, double high)
{
    seed = seed * 6364136223846793005U + 1442695040888963407U;
    return low + (high - low) * (double)(seed >> 11) * 0x1p-53;
}

static int one_of(int count) { return (int)chance(0.0, count); }

enum { LEAST_PIPES = 3, MOST_PIPES = 6 };

static const char *name_of(int i)
{
    static const char *const name[] = {"0", "1", "2", "3", "4", "5", "6", "7"};
    return name[i & 7];
}

/* Whether anything does. */
static bool stand_in_line(kent_build *b, int i)
{
    const char *at = name_of(i), *to = name_of(i + 1);
    const int what = one_of(4);
    if (what == 0) kent_build_check_valve(b, "NR", at, to);
    if (what == 1) {
        kent_build_control_valve(
            b, "CV", at, to, one_of(2) ? KENT_HOLDS_DOWNSTREAM : KENT_HOLDS_UPSTREAM,
            chance(1e5, 6e5));
    }
    if (what == 2) kent_build_valve(b, "VW", at, chance(0.01, 0.3), (double)NAN);
    return what < 3;
}

static void stand_beside(kent_build *b, int i, int in_line)
{
    const char *at = name_of(i);
    const int next =
        i == in_line ? kent_model_point_index(b->model, name_of(i - 1)) : -1;
    kent_model *m = b->model;
    if (one_of(3) == 0) {
        const int d = kent_build_surge_tank(b, "ST", at, chance(0.5, 20.0));
        m->surge_tanks[d].bottom_level = -1e4;
        m->surge_tanks[d].overflow_level = INFINITY;
        m->surge_tanks[d].next_to = next;
    }
    if (one_of(3) == 0) {
        const int d =
            kent_build_one_way_tank(b, "FT", at, chance(0.5, 20.0), chance(0.0, 40.0));
        m->one_way_tanks[d].next_to = next;
    }
    if (one_of(3) == 0) {
        const int d = kent_build_air_vessel(b, "VES", at, 1e3, chance(0.01, 10.0));
        m->air_vessels[d].next_to = next;
    }
    if (one_of(3) == 0) {
        const int d = kent_build_relief_valve(b, "RV", at, 9e5, chance(0.002, 0.05));
        m->relief_valves[d].next_to = next;
    }
    if (one_of(3) == 0) {
        const int d = kent_build_air_valve(b, "AV", at, chance(0.02, 0.2), 0.01);
        m->air_valves[d].next_to = next;
    }
}

/* From a level or a pump by up to six frictionless pipes to a level or an outflow, with
 * something in line and two places where all sorts of things stand. */
static kent_build at_random(void)
{
    kent_build b = kent_build_new();
    const int pipes = LEAST_PIPES + one_of(MOST_PIPES - LEAST_PIPES + 1);
    double x = 0.0;
    for (int i = 0; i <= pipes; i++) {
        kent_build_point(&b, name_of(i), x, 0.0, i == 0 ? 0.0 : chance(0.0, 30.0));
        x += chance(100.0, 900.0);
    }
    for (int i = 0; i < pipes; i++) {
        char route[8];
        (void)snprintf(route, sizeof route, "%s %s", name_of(i), name_of(i + 1));
        kent_build_pipe(&b, route, route, chance(0.2, 0.6), chance(700.0, 1300.0));
    }
    const int s = kent_build_scenario(&b, "all", 60.0);
    if (one_of(2)) {
        const int pump = kent_build_pump(&b, "PS", "0", NULL, 90.0, 0.15, 60.0);
        b.model->pumps[pump].suction_level = 5.0;
        b.model->pumps[pump].in_parallel = 1 + one_of(3);
        b.model->pumps[pump].check_valve =
            one_of(2) ? KENT_CHECK_IDEAL : KENT_CHECK_NONE;
        kent_build_ramp(&b, s, KENT_EVENT_PUMP, pump, 0.5, 0.0, 0.0);
        b.model->events[b.model->event_count - 1].action = KENT_TRIP;
        kent_build_fixed_level(&b, name_of(pipes), chance(20.0, 50.0));
    } else {
        kent_build_fixed_level(&b, "0", chance(40.0, 70.0));
        const int o = kent_build_outflow(&b, name_of(pipes), chance(0.01, 0.1));
        kent_build_ramp(&b, s, KENT_EVENT_OUTFLOW, o, 0.2, 0.3, 0.0);
        kent_build_ramp(&b, s, KENT_EVENT_OUTFLOW, o, 5.0, 1.0, 0.15);
    }
    const int in_line = 1 + one_of(pipes - 1);
    const bool stands = stand_in_line(&b, in_line);
    stand_beside(&b, 1 + one_of(pipes - 1), stands ? in_line : -1);
    const int breaks = 1 + one_of(pipes - 1);
    if (breaks != in_line) {
        const int burst = kent_build_burst(&b, name_of(breaks));
        const double area = chance(1e-4, 1e-2); /* m2 */
        const int e = kent_build_ramp(&b, s, KENT_EVENT_BURST, burst, 3.0, 0.1, area);
        b.model->events[e].coefficient = 0.6;
    }
    b.model->solver.friction = KENT_SURGE_NONE;
    b.model->solver.min_reaches = 3;
    return b;
}

static double held(const march *m, int span)
{
    static double head[4096], flow[4096];
    const size_t n = (size_t)m->grid->reaches[span];
    assert_in_range(n, 1, 4095);
    kent_marcher_profile(m->marcher, span, head, flow);
    return ledger_held(n, ledger_impedance(m->build->model, m->grid, (size_t)span),
                       m->grid->step, head, flow);
}

static double held_in_all(const march *m)
{
    double sum = 0.0;
    for (size_t i = 0; i < m->build->model->span_count; i++) {
        sum += held(m, (int)i);
    }
    return sum;
}

enum { STEPS = 3000, DEVICES = 8 };

/* One instant: ends' flows, in order of spans, and devices'. */
typedef struct instant {
    double flow[MOST_PIPES][2];
    kent_device_row devices[DEVICES];
} instant;

/* What flows into a node from its pipes goes into its devices, where nothing else
 * stands. */
static double gap_at_nodes(const kent_model *m, const instant *now)
{
    double worst = 0.0; /* m3/s */
    for (size_t n = 0; n < m->node_count; n++) {
        if (m->nodes[n].kind != KENT_NODE_JUNCTION) continue;
        const double sum = ledger_left_over(m, (int)n, now->flow, now->devices);
        worst = fmax(worst, fabs(sum));
    }
    return worst;
}

/* False where the case was refused: chance builds what cannot stand. */
static bool start(kent_build *b, const kent_watch *ends, march *run)
{
    kent_error err = {0};
    *run = (march){.build = b};
    if (kent_steady_solve(b->model, &run->steady, &err) == KENT_OK &&
        kent_grid_plan(b->model, 60.0, &run->grid, &err) == KENT_OK &&
        kent_marcher_new(b->model, run->steady, run->grid, 0, ends,
                         2 * b->model->span_count, 1, &run->marcher, &err) == KENT_OK) {
        return true;
    }
    print_message("not marched: %s\n", err.what);
    march_clear(run);
    return false;
}

static bool march_one(uint64_t number, double worst[3], double *largest, int *kinds)
{
    kent_watch ends[2 * MOST_PIPES];
    seed = number;
    kent_build b = at_random();
    kent_build_derive(&b);
    const kent_model *m = b.model;
    for (size_t i = 0; i < m->span_count; i++) {
        ends[2 * i] = (kent_watch){(int)i, 0.0};
        ends[2 * i + 1] = (kent_watch){(int)i, m->spans[i].length};
    }
    march run;
    if (!start(&b, ends, &run)) {
        kent_build_clear(&b);
        return false;
    }
    kent_trace trace;
    kent_error err = {0};
    instant now = {0};
    double through[DEVICES] = {0}, first[DEVICES], water = 0.0;
    const double step = run.grid->step;
    assert_in_range(m->device_count, 0, DEVICES);
    for (int i = 0; i < STEPS; i++) {
        const instant before = now;
        if (kent_marcher_advance(run.marcher, 1, &trace, &err) != 1) {
            print_message("seed %llu stops: %s\n", (unsigned long long)number,
                          err.what);
            break;
        }
        memcpy(now.flow, trace.flow, trace.watch_count * sizeof *trace.flow);
        memcpy(now.devices, trace.devices, trace.device_count * sizeof *trace.devices);
        const double water_now = held_in_all(&run);
        double net = 0.0;
        for (size_t j = 0; j < m->span_count; j++) {
            net += step * (now.flow[j][0] - now.flow[j][1]);
            *largest = fmax(*largest, fabs(now.flow[j][0]));
        }
        worst[0] = fmax(worst[0], gap_at_nodes(m, &now));
        if (i > 0) worst[1] = fmax(worst[1], fabs(water_now - water - net));
        water = water_now;
        for (size_t d = 0; d < m->device_count; d++) {
            const double has = ledger_taken(m, &m->devices[d], now.devices[d].told);
            if (i == 0) first[d] = has;
            if (i == 0) *kinds |= 1 << m->devices[d].kind;
            if (i > 0) {
                through[d] += ledger_flowed(&m->devices[d], before.devices[d].flow,
                                            now.devices[d].flow, step);
            }
            if (isnan(has)) continue;
            worst[2] = fmax(worst[2], fabs(has - first[d] - through[d]));
        }
    }
    march_clear(&run);
    kent_build_clear(&b);
    return true;
}

static void no_water_is_lost_or_made(void **state)
{
    (void)state;
    double worst[3] = {0.0, 0.0, 0.0}, largest = 0.0;
    int kinds = 0, marched = 0;
    for (uint64_t i = 0; i < 60; i++) {
        marched += march_one(i, worst, &largest, &kinds) ? 1 : 0;
    }
    print_message(
        "%d mains; flows to %.3g m3/s; at nodes %g m3/s, in pipes %g m3, in devices %g "
        "m3\n",
        marched, largest, worst[0], worst[1], worst[2]);
    assert_int_equal(kinds, (1 << KENT_DEVICE_KINDS) - 1); /* all */
    assert_true(marched >= 40 && largest > 0.1);
    assert_true(worst[0] <= 1e-10 && worst[1] <= 1e-10 && worst[2] <= 1e-9);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(without_an_event_nothing_changes),
        cmocka_unit_test(the_same_bits_come_again_with_every_kernel),
        cmocka_unit_test(what_is_left_out_might_never_have_been_there),
        cmocka_unit_test(what_a_device_cannot_do_stops_the_march),
        cmocka_unit_test(what_has_no_answer_is_said_with_place_and_time),
        cmocka_unit_test(no_water_is_lost_or_made),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
