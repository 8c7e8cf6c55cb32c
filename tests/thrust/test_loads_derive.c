/* The hand calculation: every printed line follows from the printed digits above it,
 * and its end is what the program used. */
#include "kent_arith.h"
#include "kent_check.h"
#include "kent_net.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

enum { TEXT = 1200, LEGS = 8 };

static const double PI = 3.14159265358979323846;

/* Bend in space at B (with weight and faces), tee T, reducer X, valve V, dead end D. */
static kent_build a_main(void)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 31.3);
    (void)kent_build_point(&b, "V", 170.0, 40.0, 28.1);
    (void)kent_build_point(&b, "B", 371.0, 85.0, 12.7);
    (void)kent_build_point(&b, "T", 520.0, -130.0, 17.9);
    (void)kent_build_point(&b, "D", 570.0, -90.0, 17.2);
    (void)kent_build_point(&b, "X", 640.0, -301.0, 9.4);
    (void)kent_build_point(&b, "E", 700.0, -390.0, 8.3);
    (void)kent_build_pipe(&b, "A", "R V", 0.5, 1000.0);
    (void)kent_build_pipe(&b, "C", "V B T", 0.5, 1000.0);
    (void)kent_build_pipe(&b, "G", "T D", 0.2, 1000.0);
    (void)kent_build_pipe(&b, "M", "T X", 0.5, 1000.0);
    (void)kent_build_pipe(&b, "N", "X E", 0.4, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 97.4);
    const int inline_valve = kent_build_valve(&b, "VI", "V", 0.4, (double)NAN);
    const int outlet = kent_build_valve(&b, "VE", "E", 0.05, 8.5);
    b.model->valves[inline_valve].size = 0.5;
    b.model->valves[outlet].size = 0.4;
    (void)kent_build_scenario(&b, "shut", 20.0);
    b.model->loads.test_pressure = 12.34e5;
    b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
    const int note = kent_build_note(&b, "B");
    b.model->notes[note].weight = 3210.0;
    b.model->notes[note].face = 0.83;
    return b;
}

static void take_surge(kent_net *n)
{
    static kent_made t;
    t.count = 0;
    kent_made_add(&t, n, 0.0, 90.0, 0.1);
    kent_made_add(&t, n, 0.5, 160.7, 0.037);
    kent_made_add(&t, n, 1.0, -20.0, -0.21);
    kent_made_take(&t, n, 0, 0.5, 64);
}

/* Fails with the line where printed digits do not give the printed result. */
static void assert_adds_up(const kent_derivation *d, kent_system system)
{
    assert_false(d->failed);
    for (size_t i = 0; i < d->count; i++) {
        char numbers[TEXT], value[TEXT], error[3 * TEXT] = "";
        if (d->lines[i].formula[0] == '\0') continue;
        kent_line_numbers(d, i, system, numbers, sizeof numbers);
        kent_line_value(&d->lines[i], system, value, sizeof value);
        if (!kent_arith_agrees(numbers, value, error, sizeof error)) {
            fail_msg("%s = %s: %s", d->lines[i].symbol, d->lines[i].formula, error);
        }
    }
}

static double value_of(const kent_derivation *d, const char *symbol)
{
    const kent_line *line = kent_derivation_find(d, symbol);
    if (!line) fail_msg("there is no line \"%s\"", symbol);
    return line ? line->value : (double)NAN;
}

static void assert_ends_as_used(const kent_derivation *d, kent_vec3 thrust)
{
    assert_true(value_of(d, "T_x") == thrust.x);
    assert_true(value_of(d, "T_y") == thrust.y);
    assert_true(value_of(d, "T_z") == thrust.z);
    assert_close(value_of(d, "T"), kent_vec3_length(thrust), 1e-15);
}

static void every_line_of_every_case_adds_up(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    size_t sheets = 0;
    take_surge(&n);
    kent_net_finish(&n);
    for (size_t i = 0; i < n.loads->fitting_count; i++) {
        const kent_fitting *f = &n.model->fittings[i];
        for (size_t k = 0; k < n.loads->fittings[i].count; k++) {
            const kent_load_case *c = &n.loads->fittings[i].cases[k];
            for (int sense = 0; sense < KENT_SENSES; sense++) {
                kent_derivation d = {0};
                kent_loads_derive(n.model, f, c, (kent_sense)sense, &d);
                assert_adds_up(&d, KENT_SI);
                assert_adds_up(&d, KENT_US);
                if (c->worst[sense].set) {
                    assert_ends_as_used(&d, c->worst[sense].balance.thrust);
                    sheets++;
                } else {
                    assert_int_equal(d.count, 1); /* says that there is none */
                }
                kent_derivation_clear(&d);
            }
        }
    }
    assert_true(sheets > 50);
    kent_net_clear(&n);
}

/* C is worked out from the type's short form alone. */
static void assert_check_line(const kent_net *n, const char *fitting, const char *name)
{
    const kent_load_case *c = kent_net_case(n, fitting, name);
    kent_derivation d = {0};
    kent_loads_derive(n->model, kent_net_fitting(n, fitting), c, KENT_RESULTANT, &d);
    assert_close(value_of(&d, "C"), value_of(&d, "T"), 1e-9);
    kent_derivation_clear(&d);
}

static void the_check_line_gives_the_resultant(void **state)
{
    (void)state;
    kent_build b = a_main();
    b.model->notes[0].weight = (double)NAN; /* the short forms leave weight out, */
    b.model->notes[0].face = (double)NAN;   /* and changing flow */
    /* and hold for what lies in line: T between B and X, E beyond X */
    b.model->points[3].at = (kent_vec3){505.5, -108.0, 11.05};
    b.model->points[6].at = (kent_vec3){707.25, -397.5, 8.575};
    b.model->points[1].at = (kent_vec3){185.5, 42.5, 22.0}; /* V midway to B */
    kent_net n = kent_net_of(b);
    take_surge(&n);
    kent_net_finish(&n);
    assert_check_line(&n, "B", "test");
    assert_check_line(&n, "B", "shut");
    assert_check_line(&n, "T", "test");
    assert_check_line(&n, "X", "static");
    assert_check_line(&n, "D", "test");
    assert_check_line(&n, "D", "shut");
    assert_check_line(&n, "V", "shut");
    assert_check_line(&n, "V", "closed from R");
    assert_check_line(&n, "V", "closed from B");
    assert_check_line(&n, "E", "closed from X");
    kent_net_clear(&n);
}

static void where_no_short_form_holds_none_is_printed(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main()); /* the run turns at T, the axis at X */
    static const char *const IDS[] = {"T", "X"};
    kent_net_finish(&n);
    for (size_t i = 0; i < 2; i++) {
        kent_derivation d = {0};
        kent_loads_derive(n.model, kent_net_fitting(&n, IDS[i]),
                          kent_net_case(&n, IDS[i], "test"), KENT_RESULTANT, &d);
        assert_null(kent_derivation_find(&d, "C"));
        assert_non_null(strstr(d.lines[d.count - 1].says, "no short form"));
        kent_derivation_clear(&d);
    }
    kent_net_clear(&n);
}

static void the_test_case_carries_its_pressure_from_the_gauge(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    char numbers[TEXT];
    kent_derivation d = {0};
    kent_net_finish(&n);
    kent_loads_derive(n.model, kent_net_fitting(&n, "B"),
                      kent_net_case(&n, "B", "test"), KENT_RESULTANT, &d);
    const kent_line *p = kent_derivation_find(&d, "p");
    assert_non_null(p);
    assert_string_equal(p->formula, "p_test+rho*g*(z_gauge-z)");
    kent_line_numbers(&d, (size_t)(p - d.lines), KENT_SI, numbers, sizeof numbers);
    assert_string_equal(numbers, "1234.00+1.00000*9.80665*(8.30000-12.7000)");
    kent_derivation_clear(&d);
    kent_net_clear(&n);
}

static void weight_and_changing_flow_stand_there_even_when_nil(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    kent_derivation d = {0};
    kent_net_finish(&n);
    kent_loads_derive(n.model, kent_net_fitting(&n, "X"),
                      kent_net_case(&n, "X", "steady"), KENT_RESULTANT, &d);
    static const char *const ROWS[] = {"W_x", "W_y", "W_z", "U_x", "U_y", "U_z"};
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        assert_true(value_of(&d, ROWS[i]) == 0.0);
    }
    kent_derivation_clear(&d);
    kent_net_clear(&n);
}

static void changing_flow_is_worked_out_where_faces_are_given(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    kent_derivation d = {0};
    take_surge(&n);
    kent_net_finish(&n);
    const kent_load_case *c = kent_net_case(&n, "B", "shut");
    kent_loads_derive(n.model, kent_net_fitting(&n, "B"), c, KENT_RESULTANT, &d);
    assert_true(value_of(&d, "U_x") == c->worst[KENT_RESULTANT].balance.unsteady.x);
    assert_true(fabs(value_of(&d, "U_x")) > 1.0);
    assert_true(value_of(&d, "W_z") == -3210.0);
    kent_derivation_clear(&d);
    kent_net_clear(&n);
}

/* Eight legs: the longest formulas there are. */
static void eight_ports_fit_on_a_line(void **state)
{
    (void)state;
    kent_port ports[LEGS];
    for (size_t i = 0; i < LEGS; i++) {
        const double turn = 0.7 * (double)i;
        const kent_vec3 out = {cos(turn), sin(turn), 0.1 * (double)i};
        ports[i] = kent_build_port(out, 5e5 + 1e4 * (double)i, i % 2 ? 0.1 : -0.1,
                                   0.3 + 0.01 * (double)i);
        ports[i].momentum_factor = (double)NAN;
    }
    kent_build b = kent_build_new();
    (void)kent_build_ports(&b, "F", KENT_CROSS, ports, LEGS);
    kent_build_derive(&b);
    kent_steady nothing = {0}, *steadies = &nothing;
    kent_error err = {0};
    kent_recorder *r = NULL;
    kent_loads_result *loads = NULL;
    assert_int_equal(kent_recorder_new(b.model, &steadies, &r, &err), KENT_OK);
    assert_int_equal(kent_recorder_finish(r, NULL, &loads, &err), KENT_OK);

    kent_load_case c = loads->fittings[0].cases[0];
    for (size_t i = 0; i < LEGS; i++) { /* and changing flow in every leg */
        b.model->ports[i].face = 0.5;
        c.worst[KENT_RESULTANT].balance.port[i].flow_rate = 0.01 * (double)(i + 1);
    }
    kent_balance_sum(b.model->ports, LEGS, 1000.0, &c.worst[KENT_RESULTANT].balance);
    kent_derivation d = {0};
    kent_loads_derive(b.model, &b.model->fittings[0], &c, KENT_RESULTANT, &d);
    assert_adds_up(&d, KENT_SI);
    assert_adds_up(&d, KENT_US);
    assert_ends_as_used(&d, c.worst[KENT_RESULTANT].balance.thrust);
    kent_derivation_clear(&d);
    kent_loads_free(loads);
    kent_recorder_free(r);
    kent_build_clear(&b);
}

/* A level 45 degree bend at rest, by hand: 2 x 1000 x 0.196350 x sin 22.5. */
static void a_bend_by_pocket_calculator(void **state)
{
    (void)state;
    const kent_port ports[2] = {
        kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, 1e6, 0.0, 0.5),
        kent_build_port((kent_vec3){cos(PI / 4.0), sin(PI / 4.0), 0.0}, 1e6, 0.0, 0.5)};
    kent_build b = kent_build_new();
    (void)kent_build_ports(&b, "F", KENT_BEND, ports, 2);
    kent_build_derive(&b);
    kent_steady nothing = {0}, *steadies = &nothing;
    kent_error err = {0};
    kent_recorder *r = NULL;
    kent_loads_result *loads = NULL;
    char printed[TEXT];
    assert_int_equal(kent_recorder_new(b.model, &steadies, &r, &err), KENT_OK);
    assert_int_equal(kent_recorder_finish(r, NULL, &loads, &err), KENT_OK);
    kent_derivation d = {0};
    kent_loads_derive(b.model, &b.model->fittings[0], &loads->fittings[0].cases[0],
                      KENT_RESULTANT, &d);
    const kent_line *check = kent_derivation_find(&d, "C");
    assert_non_null(check);
    kent_line_numbers(&d, (size_t)(check - d.lines), KENT_SI, printed, sizeof printed);
    assert_string_equal(printed, "2*1000.00*0.196350*sin(45.0000deg/2)");
    kent_line_value(check, KENT_SI, printed, sizeof printed);
    assert_string_equal(printed, "150.279 kN");
    kent_derivation_clear(&d);
    kent_loads_free(loads);
    kent_recorder_free(r);
    kent_build_clear(&b);
}

/* A 24 in dead end at 200 psi: 90 480 lbf on the nominal bore (City of Renton WA,
 * drawing S-3415), 25.80 in outside (AWWA C151): 15.6 % more. */
static void what_the_outside_adds_to_the_bore_is_told(void **state)
{
    (void)state;
    kent_port port = kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, 200.0 * 6894.757, 0.0,
                                     24 * 0.0254);
    port.outside_diameter = port.seal_diameter = 25.80 * 0.0254;
    kent_build b = kent_build_new();
    (void)kent_build_ports(&b, "F", KENT_DEAD_END, &port, 1);
    kent_build_derive(&b);
    kent_steady nothing = {0}, *steadies = &nothing;
    kent_error err = {0};
    kent_recorder *r = NULL;
    kent_loads_result *loads = NULL;
    assert_int_equal(kent_recorder_new(b.model, &steadies, &r, &err), KENT_OK);
    assert_int_equal(kent_recorder_finish(r, NULL, &loads, &err), KENT_OK);
    kent_derivation d = {0};
    kent_loads_derive(b.model, &b.model->fittings[0], &loads->fittings[0].cases[0],
                      KENT_RESULTANT, &d);
    const kent_line *more = kent_derivation_find(&d, "more_1");
    assert_non_null(more);
    const kent_instant *worst = &loads->fittings[0].cases[0].worst[KENT_RESULTANT];
    const double thrust = kent_vec3_length(kent_instant_lasting(worst));
    assert_close(more->value, thrust / (90480.0 * 4.448222) - 1.0, 2e-3);
    kent_derivation_clear(&d);
    kent_loads_free(loads);
    kent_recorder_free(r);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_line_of_every_case_adds_up),
        cmocka_unit_test(the_check_line_gives_the_resultant),
        cmocka_unit_test(where_no_short_form_holds_none_is_printed),
        cmocka_unit_test(the_test_case_carries_its_pressure_from_the_gauge),
        cmocka_unit_test(weight_and_changing_flow_stand_there_even_when_nil),
        cmocka_unit_test(changing_flow_is_worked_out_where_faces_are_given),
        cmocka_unit_test(eight_ports_fit_on_a_line),
        cmocka_unit_test(a_bend_by_pocket_calculator),
        cmocka_unit_test(what_the_outside_adds_to_the_bore_is_told),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
