/* Sensitivity: every variation to the bit as the case would be written with it, in the
 * direction that theory gives, and only where it can tell something. */
#include "kent_alloc_fail.h"
#include "kent_build.h"
#include "kent_check.h"
#include "kent_job.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* What a case below is written with. */
typedef struct written {
    double wave_speed;        /* m/s */
    double inertia;           /* kg m2 */
    double pump_delay, delay; /* s: of its check valve, of the one in line */
    double coefficient;       /* of the air valve */
    double ramp, law, tail;   /* s: of the valve, of the draw, and what follows */
} written;

static const written BASE = {1000.0, 5.0, 0.2, 0.0, 0.6, 2.0, 3.0, 5.0};

/* A pump lifts through a crest with an air valve and a check valve in line to a valve
 * before a tank; "cut" trips it, "shut" closes the valve and draws less half-way. Two
 * states: one is rougher. */
static kent_build main_as(written w)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "P", 0.0, 0.0, 5.0);
    kent_build_point(&b, "K", 400.0, 0.0, 25.0);
    kent_build_point(&b, "N", 600.0, 50.0, 10.0);
    kent_build_point(&b, "D", 800.0, 100.0, 5.0);
    kent_build_point(&b, "E", 900.0, 300.0, 5.0);
    kent_build_point(&b, "R", 1000.0, 300.0, 35.0);
    const int pipe = kent_build_pipe(&b, "A", "P K N D E R", 0.3, w.wave_speed);
    b.model->pipes[pipe].friction = KENT_DARCY_FIXED;
    b.model->pipes[pipe].friction_coefficient = 0.02;
    const int pump = kent_build_pump(&b, "PS", "P", NULL, 60.0, 0.07, 45.0);
    b.model->pumps[pump].suction_level = 10.0;
    b.model->pumps[pump].check_valve = KENT_CHECK_DELAYED;
    b.model->pumps[pump].check_delay = w.pump_delay;
    b.model->pumps[pump].inertia = w.inertia;
    const int flap = kent_build_check_valve(&b, "NR", "N", "D");
    b.model->check_valves[flap].delay = w.delay;
    const int air = kent_build_air_valve(&b, "AV", "K", 0.05, 0.01);
    b.model->air_valves[air].admission_coefficient = w.coefficient;
    b.model->air_valves[air].release_coefficient = w.coefficient;
    const int draw = kent_build_outflow(&b, "D", 0.01);
    const int valve = kent_build_valve(&b, "V", "E", 0.1, (double)NAN);
    kent_build_fixed_level(&b, "R", 40.0);
    const int cut = kent_build_scenario(&b, "cut", 10.0);
    const int trip =
        kent_build_ramp(&b, cut, KENT_EVENT_PUMP, pump, 0.5, (double)NAN, (double)NAN);
    b.model->events[trip].action = KENT_TRIP;
    const int shut = kent_build_scenario(&b, "shut", 1.0 + w.law + w.tail);
    kent_build_ramp(&b, shut, KENT_EVENT_VALVE, valve, 0.5, w.ramp, 0.0);
    const kent_law_point law[] = {{0.0, 0.01}, {w.law, 0.005}};
    kent_build_law(&b, shut, KENT_EVENT_OUTFLOW, draw, 1.0, law, 2);
    kent_build_state(&b, "normal");
    const int rough = kent_build_state(&b, "rough");
    b.model->states[rough].roughness_factor = 1.3;
    kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
    kent_build_derive(&b);
    return b;
}

static kent_sensitivity *vary(const kent_model *m)
{
    kent_error err = {0};
    kent_sensitivity *s = NULL;
    if (kent_sensitivity_run(m, &(kent_job_options){.threads = 2}, &s, &err)) {
        fail_msg("%s: %s", err.where, err.what);
    }
    return s;
}

/* Fails unless both say the same to the last bit. */
static void assert_same(const kent_gauge *a, const kent_gauge *b)
{
    const double x[] = {a->highest, a->lowest, a->area, a->volume, a->length};
    const double y[] = {b->highest, b->lowest, b->area, b->volume, b->length};
    assert_memory_equal(x, y, sizeof x);
    assert_int_equal(a->held, b->held);
    assert_int_equal(a->type, b->type);
    assert_string_equal(a->governing.s, b->governing.s);
}

static void a_variation_is_the_case_written_with_it(void **state)
{
    (void)state;
    written as[KENT_VARIES][KENT_WAYS];
    for (int k = 0; k < KENT_VARIES * KENT_WAYS; k++) {
        as[k / KENT_WAYS][k % KENT_WAYS] = BASE;
    }
    as[KENT_VARY_WAVE_SPEED][KENT_LESS].wave_speed *= 0.9;
    as[KENT_VARY_WAVE_SPEED][KENT_MORE].wave_speed *= 1.1;
    as[KENT_VARY_INERTIA][KENT_LESS].inertia *= 0.5;
    as[KENT_VARY_INERTIA][KENT_MORE].inertia *= 1.5;
    as[KENT_VARY_CHECK_DELAY][KENT_LESS].pump_delay = 0.0;
    as[KENT_VARY_CHECK_DELAY][KENT_MORE].pump_delay *= 2.0;
    as[KENT_VARY_CHECK_DELAY][KENT_MORE].delay = 0.5; /* it was ideal */
    as[KENT_VARY_AIR_VALVES][KENT_LESS].coefficient *= 0.75;
    as[KENT_VARY_AIR_VALVES][KENT_MORE].coefficient *= 1.25;
    as[KENT_VARY_EVENT_TIME][KENT_LESS].ramp *= 0.8;
    as[KENT_VARY_EVENT_TIME][KENT_LESS].law *= 0.8;
    as[KENT_VARY_EVENT_TIME][KENT_LESS].tail += BASE.law - 0.8 * BASE.law;
    as[KENT_VARY_EVENT_TIME][KENT_MORE].ramp *= 1.2;
    as[KENT_VARY_EVENT_TIME][KENT_MORE].law *= 1.2;

    kent_build b = main_as(BASE);
    kent_sensitivity *s = vary(b.model);
    for (int k = 0; k < KENT_VARIES * KENT_WAYS; k++) {
        const int what = k / KENT_WAYS, way = k % KENT_WAYS;
        kent_build other = main_as(as[what][way]);
        kent_sensitivity *alone = vary(other.model);
        bool moved = false;
        assert_non_null(s->varied[what][way]);
        for (size_t i = 0; i < s->fitting_count; i++) {
            const kent_gauge *g = &s->varied[what][way][i];
            assert_same(g, &alone->base[i]);
            moved = moved || g->highest != s->base[i].highest ||
                    g->lowest != s->base[i].lowest;
        }
        assert_true(moved); /* so that the above says something */
        kent_sensitivity_free(alone);
        kent_build_clear(&other);
    }
    kent_sensitivity_free(s);
    kent_build_clear(&b);
}

/* More inertia keeps the pump turning after its trip: the fall behind it is less deep
 * (J. Parmakian, Waterhammer Analysis, 1955, from memory). */
static void inertia_lifts_the_lowest_head_after_a_trip(void **state)
{
    (void)state;
    written airless = BASE; /* an air valve would hold the crest at its own pressure */
    airless.coefficient = 1e-6;
    kent_build b = main_as(airless);
    b.model->scenario_count = 1; /* "cut" alone */
    b.model->march_count = 2;    /* from both states */
    kent_sensitivity *s = vary(b.model);
    const int at = kent_build_fitting_of(&b, "K");
    const double base = s->base[at].lowest;
    assert_true(s->varied[KENT_VARY_INERTIA][KENT_MORE][at].lowest > base + 1e3);
    assert_true(s->varied[KENT_VARY_INERTIA][KENT_LESS][at].lowest < base - 1e3);
    assert_null(s->varied[KENT_VARY_EVENT_TIME][KENT_MORE]); /* a trip has no time */
    kent_sensitivity_free(s);
    b.model->scenario_count = 2;
    kent_build_clear(&b);
}

/* 1 km from a tank to a valve; frictionless; the valve shuts in `ramp`. No device. */
static kent_build plain_main(double ramp)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 30.0);
    kent_build_point(&b, "B", 500.0, 0.0, 0.0);
    kent_build_point(&b, "E", 900.0, 300.0, 0.0);
    kent_build_pipe(&b, "A", "R B E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", 60.0);
    const int valve = kent_build_valve(&b, "V", "E", 0.02, 20.0);
    kent_build_ramp(&b, kent_build_scenario(&b, "shut", 25.0), KENT_EVENT_VALVE, valve,
                    0.5, ramp, 0.0);
    kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
    kent_build_derive(&b);
    return b;
}

/* Joukowsky's rise is rho a dV (N. Joukowsky, 1898; 18.2): it moves with a. */
static void a_sudden_rise_goes_by_the_wave_speed(void **state)
{
    (void)state;
    kent_build b = plain_main(0.0);
    kent_sensitivity *s = vary(b.model);
    const int at = kent_build_fitting_of(&b, "E");
    /* m: 60 m less V2/2g, of Q = 0.02 sqrt(h - 20 m) through 500 mm; no friction */
    const double area = 0.25 * 3.14159265358979 * 0.5 * 0.5;
    const double c = 0.02 * 0.02 / (area * area * 2.0 * 9.80665);
    const double still = 1000.0 * 9.80665 * (60.0 + 20.0 * c) / (1.0 + c); /* Pa */
    const double rise = s->base[at].highest - still;
    assert_true(rise > 1e5);
    for (int way = 0; way < KENT_WAYS; way++) {
        const kent_gauge *g = &s->varied[KENT_VARY_WAVE_SPEED][way][at];
        assert_close((g->highest - still) / rise, way == KENT_MORE ? 1.1 : 0.9, 1e-6);
        assert_null(s->varied[KENT_VARY_INERTIA][way]);
        assert_null(s->varied[KENT_VARY_CHECK_DELAY][way]);
        assert_null(s->varied[KENT_VARY_AIR_VALVES][way]);
        assert_null(s->varied[KENT_VARY_EVENT_TIME][way]); /* at once is at once */
    }
    kent_sensitivity_free(s);
    kent_build_clear(&b);
}

/* Of a closure many times 2L/a the rise goes about as 1/T, as of a rigid column (L.
 * Michaud, 1878; 18.4): a fifth longer, a sixth less. */
static void a_slow_rise_goes_by_one_over_its_time(void **state)
{
    (void)state;
    kent_build b = plain_main(20.0); /* 2L/a is 2 s */
    kent_sensitivity *s = vary(b.model);
    const int at = kent_build_fitting_of(&b, "E");
    const double still = 1000.0 * 9.80665 * 60.0;
    const double rise = s->base[at].highest - still;
    const double less = s->varied[KENT_VARY_EVENT_TIME][KENT_LESS][at].highest - still;
    const double more = s->varied[KENT_VARY_EVENT_TIME][KENT_MORE][at].highest - still;
    assert_true(rise > 1e4);
    assert_close(more / rise, 1.0 / 1.2, 0.05);
    assert_close(less / rise, 1.0 / 0.8, 0.05);
    kent_sensitivity_free(s);
    kent_build_clear(&b);
}

static void without_a_scenario_nothing_is_run(void **state)
{
    (void)state;
    kent_build b = plain_main(2.0);
    b.model->scenario_count = 0;
    b.model->march_count = 0;
    kent_sensitivity *s = vary(b.model);
    for (int k = 0; k < KENT_VARIES * KENT_WAYS; k++) {
        assert_null(s->varied[k / KENT_WAYS][k % KENT_WAYS]);
        assert_int_equal(s->stopped[k / KENT_WAYS][k % KENT_WAYS].status, KENT_OK);
    }
    assert_true(isnan(s->base[0].highest));
    kent_sensitivity_free(s);
    b.model->scenario_count = 1;
    kent_build_clear(&b);
}

/* A level that moves by itself, and a demand that comes again, are no closures; one
 * law of two events is stretched once. */
static void what_is_stretched(void **state)
{
    (void)state;
    const kent_variation longer = kent_variation_of(KENT_VARY_EVENT_TIME, true);
    const kent_law_point law[] = {{0.0, 0.01}, {4.0, 0.0}};
    kent_build b = plain_main(5.0);
    const int draw = kent_build_outflow(&b, "B", 0.01);
    const int again = kent_build_law(&b, 0, KENT_EVENT_OUTFLOW, draw, 1.0, law, 2);
    const int twin = kent_build_law(&b, 0, KENT_EVENT_OUTFLOW, draw, 9.0, law, 2);
    const int level = kent_build_law(&b, 0, KENT_EVENT_FIXED_LEVEL, 0, 1.0, law, 2);
    const int daily = kent_build_law(&b, 0, KENT_EVENT_OUTFLOW, draw, 1.0, law, 2);
    kent_event *events = b.model->events;
    events[twin].law_first = events[again].law_first;
    events[daily].period = 6.0;
    kent_model *v = kent_model_varied(b.model, longer);
    assert_non_null(v);
    assert_close(v->events[0].ramp_time, 6.0, 1e-15);
    assert_close(v->law[events[again].law_first + 1].time, 4.8, 1e-15);
    assert_close(v->law[events[level].law_first + 1].time, 4.0, 1e-15);
    assert_close(v->law[events[daily].law_first + 1].time, 4.0, 1e-15);
    assert_close(v->scenarios[0].duration, 25.8, 1e-15); /* the twin ends last */
    assert_close(b.model->scenarios[0].duration, 25.0, 1e-15);
    kent_model_varied_free(v);
    kent_build_clear(&b);
}

/* A one-sided answer: a surge tank that just does not run dry in the case does so where
 * a draw begins in less time. */
static void a_march_that_stops_says_so_in_its_place(void **state)
{
    (void)state;
    double lowest[2] = {0.0};
    for (int k = 0; k < 3; k++) {
        kent_build b = kent_build_new();
        kent_error err = {0};
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "T", 900.0, 0.0, 0.0);
        kent_build_point(&b, "E", 1000.0, 50.0, 0.0);
        kent_build_pipe(&b, "A", "R T E", 0.5, 1000.0);
        kent_build_fixed_level(&b, "R", 60.0);
        kent_build_surge_tank(&b, "ST", "T", 1.0);
        if (k == 2) {
            b.model->surge_tanks[0].bottom_level = 0.5 * (lowest[0] + lowest[1]);
        }
        const int draw = kent_build_outflow(&b, "E", 0.0);
        kent_build_ramp(&b, kent_build_scenario(&b, "draw", 60.0), KENT_EVENT_OUTFLOW,
                        draw, 1.0, k == 1 ? 16.0 : 20.0, 0.2);
        kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
        kent_build_derive(&b);
        if (k == 2) {
            kent_sensitivity *s = vary(b.model);
            const kent_error *less = &s->stopped[KENT_VARY_EVENT_TIME][KENT_LESS];
            assert_null(s->varied[KENT_VARY_EVENT_TIME][KENT_LESS]);
            assert_int_equal(less->status, KENT_E_SOLVE);
            assert_non_null(strstr(less->what, "ST"));
            assert_non_null(s->varied[KENT_VARY_EVENT_TIME][KENT_MORE]);
            kent_sensitivity_free(s);
        } else {
            kent_results *r = NULL;
            const kent_job_options one = {.threads = 1, .one_grid = true};
            assert_int_equal(kent_job_run(b.model, &one, &r, &err), KENT_OK);
            lowest[k] = r->scenarios[0].points[1].lowest_head;
            kent_results_free(r);
        }
        kent_build_clear(&b);
    }
    assert_true(lowest[1] < lowest[0] - 0.01);
}

static int view_once(void *context)
{
    kent_model *v =
        kent_model_varied(context, kent_variation_of(KENT_VARY_WAVE_SPEED, true));
    if (!v) return -1;
    kent_model_varied_free(v);
    return 0;
}

static int vary_once(void *context)
{
    kent_error err = {0};
    kent_sensitivity *s = NULL;
    const kent_status status =
        kent_sensitivity_run(context, &(kent_job_options){.threads = 1}, &s, &err);
    if (!status) {
        kent_sensitivity_free(s);
        return 0;
    }
    assert_int_equal(status, KENT_E_NOMEM);
    assert_null(s);
    return -1;
}

static void a_refused_allocation_is_out_of_memory(void **state)
{
    (void)state;
    enum { EVERY = 37 }; /* of some thousands */
    long granted = 0, refused = 0;
    kent_build b = plain_main(1.0);
    b.model->scenarios[0].duration = 2.0;
    assert_true(kent_allocations_needed(view_once, b.model) >= 4);
    for (bool done = false; !done; granted += EVERY) {
        kent_allocations_grant(granted);
        done = vary_once(b.model) == 0;
        kent_allocations_grant(-1);
        if (!done) refused++;
    }
    assert_true(refused > 10);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_variation_is_the_case_written_with_it),
        cmocka_unit_test(inertia_lifts_the_lowest_head_after_a_trip),
        cmocka_unit_test(a_sudden_rise_goes_by_the_wave_speed),
        cmocka_unit_test(a_slow_rise_goes_by_one_over_its_time),
        cmocka_unit_test(without_a_scenario_nothing_is_run),
        cmocka_unit_test(what_is_stretched),
        cmocka_unit_test(a_march_that_stops_says_so_in_its_place),
        cmocka_unit_test(a_refused_allocation_is_out_of_memory),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
