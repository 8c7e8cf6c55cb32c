/* Legs that can be shut one at a time, and suction: which cases there are, their sizes
 * and signs by hand. */
#include "kent_arith.h"
#include "kent_check.h"
#include "kent_net.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

enum { TEXT = 1200 };

static const double PI = 3.14159265358979323846;
static const double RHO = 1000.0, G = 9.80665;

static double area(double diameter) { return 0.25 * PI * diameter * diameter; }

/* R (level 100 m) - X - E along +x, N and S north and south of X; all at 10 m, bore 0.3
 * m, outside 0.32 m. Nothing but R supplies it. */
static kent_build a_cross(void)
{
    kent_build b = kent_build_new();
    b.model->water.density = RHO;
    b.model->gravity = G;
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "X", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 10.0);
    (void)kent_build_point(&b, "N", 100.0, 100.0, 10.0);
    (void)kent_build_point(&b, "S", 100.0, -100.0, 10.0);
    (void)kent_build_pipe(&b, "A", "R X", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "B", "X E", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "C", "X N", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "D", "X S", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    return b;
}

static kent_build a_tee(void)
{
    kent_build b = kent_build_new();
    b.model->water.density = RHO;
    b.model->gravity = G;
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "X", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 10.0);
    (void)kent_build_point(&b, "N", 100.0, 100.0, 10.0);
    (void)kent_build_pipe(&b, "A", "R X E", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "C", "X N", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    return b;
}

/* On the fitting at X: these legs can be shut, "E N", and no others. */
static void closes(kent_build *b, const char *const *legs, size_t count)
{
    const int index = kent_build_note(b, "X");
    kent_stated *s = &b->model->notes[index].stated;
    b->model->closes = calloc(count + 1, sizeof *b->model->closes);
    assert_non_null(b->model->closes);
    for (size_t i = 0; i < count; i++) {
        b->model->closes[i] = kent_model_point_index(b->model, legs[i]);
    }
    b->model->closes_count = s->closes_count = count;
    s->closes_stated = true;
}

static kent_net finished(kent_build b)
{
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    return n;
}

/* How many cases of a fitting start so. */
static size_t cases_of(const kent_net *n, const char *fitting, const char *start)
{
    const kent_fitting_loads *loads =
        &n->loads->fittings[kent_build_fitting_of(&n->build, fitting)];
    size_t count = 0;
    for (size_t i = 0; i < loads->count; i++) {
        count += strncmp(loads->cases[i].name, start, strlen(start)) == 0;
    }
    return count;
}

static kent_vec3 thrust(const kent_net *n, const char *fitting, const char *name)
{
    return kent_net_case(n, fitting, name)->worst[KENT_RESULTANT].balance.thrust;
}

static void assert_vector(kent_vec3 got, double x, double y)
{
    const double near = 1e-9 * (fabs(x) + fabs(y)) + 1e-6;
    assert_within(got.x, x, near);
    assert_within(got.y, y, near);
    assert_within(got.z, 0.0, near);
}

/* ---- which legs ------------------------------------------------------------------ */

/* 90 m of water on 0.32 m, away from what is under pressure. As built it is balanced.
 */
static void each_leg_of_a_cross_is_shut_in_turn(void **state)
{
    (void)state;
    kent_net n = finished(a_cross());
    const double push = RHO * G * 90.0 * area(0.32);
    assert_vector(thrust(&n, "X", "static"), 0.0, 0.0);
    assert_vector(thrust(&n, "X", "closed from R"), push, 0.0);
    assert_vector(thrust(&n, "X", "closed to R"), -push, 0.0);
    assert_vector(thrust(&n, "X", "closed to E"), push, 0.0);
    assert_vector(thrust(&n, "X", "closed to N"), 0.0, push);
    assert_vector(thrust(&n, "X", "closed to S"), 0.0, -push);
    /* nothing behind the dead legs could press on them alone */
    assert_int_equal(cases_of(&n, "X", "closed from"), 1);
    assert_int_equal(cases_of(&n, "X", "closed to"), 4);
    const kent_load_case *c = kent_net_case(&n, "X", "closed to N");
    assert_true(c->emptied && !c->closed && c->kind == KENT_CASE_STATIC);
    const size_t dry = kent_net_fitting(&n, "X")->port_first + c->dry;
    assert_int_equal(n.model->ports[dry].toward, kent_model_point_index(n.model, "N"));
    assert_true(c->worst[KENT_RESULTANT].balance.port[c->dry].push == 0.0);
    kent_net_clear(&n);
}

/* A level behind E supplies N as well, round the cross: R - X - E, E - N. */
static void a_leg_supplied_round_a_loop_presses_alone(void **state)
{
    (void)state;
    kent_build b = a_cross();
    (void)kent_build_pipe(&b, "L", "E N", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "E", 120.0);
    kent_net n = finished(b);
    const double push = RHO * G * 110.0 * area(0.32); /* the highest connected */
    assert_vector(thrust(&n, "X", "closed from N"), 0.0, -push);
    assert_vector(thrust(&n, "X", "closed from E"), -push, 0.0);
    assert_int_equal(cases_of(&n, "X", "closed from"), 3); /* not S */
    kent_net_clear(&n);
}

/* And one behind a pump; a check valve's far side counts as open. */
static void a_pump_presses_alone(void **state)
{
    (void)state;
    kent_build b = a_cross();
    const int p = kent_build_pump(&b, "PS", "S", NULL, 130.0, 0.05, 100.0);
    b.model->pumps[p].suction_level = 10.0;
    kent_net n = finished(b);
    assert_int_equal(cases_of(&n, "X", "closed from S"), 1);
    assert_int_equal(cases_of(&n, "X", "closed from N"), 0);
    kent_net_clear(&n);
}

static void a_case_says_which_legs_close(void **state)
{
    (void)state;
    static const char *const LEGS[] = {"R", "S"};
    kent_build some = a_cross(), none = a_cross();
    closes(&some, LEGS, 2);
    closes(&none, NULL, 0);
    kent_net n = finished(some);
    assert_int_equal(cases_of(&n, "X", "closed"), 3); /* from R, to R, to S */
    assert_int_equal(cases_of(&n, "X", "closed to S"), 1);
    kent_net_clear(&n);
    n = finished(none);
    assert_int_equal(cases_of(&n, "X", "closed"), 0);
    kent_net_clear(&n);
}

/* By itself none; of the run that of R pushes along and across. */
static void a_tee_closes_where_it_is_said(void **state)
{
    (void)state;
    static const char *const LEGS[] = {"E"};
    kent_build b = a_tee();
    closes(&b, LEGS, 1);
    kent_net plain = finished(a_tee()), n = finished(b);
    const double push = RHO * G * 90.0 * area(0.32);
    assert_int_equal(cases_of(&plain, "X", "closed"), 0);
    assert_vector(thrust(&plain, "X", "static"), 0.0, -push);
    assert_vector(thrust(&n, "X", "closed to E"), push, -push);
    assert_int_equal(cases_of(&n, "X", "closed"), 1);
    kent_net_clear(&plain);
    kent_net_clear(&n);
}

/* Two legs and a bolted branch at 45 degrees are no junction with valves. */
static void a_run_with_a_dead_branch_is_not_shut(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "X", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 10.0);
    (void)kent_build_pipe(&b, "A", "R X E", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    const int note = kent_build_note(&b, "X");
    b.model->notes[note].branch = (kent_branch){.end = KENT_BRANCH_BLANK,
                                                .direction = {1.0, 1.0, 0.0},
                                                .outside_diameter = 0.11,
                                                .inside_diameter = 0.10,
                                                .joint = KENT_FLANGED};
    kent_net n = finished(b);
    assert_int_equal(kent_net_fitting(&n, "X")->type, KENT_WYE);
    assert_int_equal(cases_of(&n, "X", "closed"), 0);
    kent_net_clear(&n);
}

/* A cross held as one with a bend 3 m away keeps its valves; the leg between them is
 * inside. */
static void a_cross_in_a_group_is_shut_too(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    b.model->water.density = RHO;
    b.model->gravity = G;
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "X", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "B", 103.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 103.0, 100.0, 10.0);
    (void)kent_build_point(&b, "N", 100.0, 100.0, 10.0);
    (void)kent_build_point(&b, "S", 100.0, -100.0, 10.0);
    (void)kent_build_pipe(&b, "A", "R X B E", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "C", "N X S", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    const int note = kent_build_note(&b, "X");
    const int bend = kent_model_point_index(b.model, "B");
    b.model->together = malloc(sizeof *b.model->together);
    assert_non_null(b.model->together);
    b.model->together[0] = bend;
    b.model->together_count = b.model->notes[note].together_count = 1;
    kent_net n = finished(b);
    const double push = RHO * G * 90.0 * area(0.32);
    assert_int_equal(n.model->fitting_count, 4);
    const char *group = n.model->fittings[kent_build_fitting_of(&n.build, "X")].id;
    /* as built R pushes east, E south, N and S cancel */
    assert_vector(thrust(&n, group, "static"), push, -push);
    assert_vector(thrust(&n, group, "closed to N"), push, 0.0);
    assert_vector(thrust(&n, group, "closed to R"), 0.0, -push);
    assert_int_equal(cases_of(&n, group, "closed to E"), 0); /* the bend's */
    kent_net_clear(&n);
}

/* Three pipes are enough at a wye: each of its legs is taken to have a valve. */
static void the_legs_of_a_wye_are_shut_in_turn(void **state)
{
    (void)state;
    kent_build b = a_tee();
    const int note = kent_build_note(&b, "X");
    b.model->notes[note].type = KENT_WYE;
    kent_net n = finished(b);
    const double push = RHO * G * 90.0 * area(0.32);
    assert_int_equal(cases_of(&n, "X", "closed to"), 3);
    assert_vector(thrust(&n, "X", "closed to N"), 0.0, 0.0);
    assert_vector(thrust(&n, "X", "closed to E"), push, -push);
    kent_net_clear(&n);
}

/* ---- what presses ---------------------------------------------------------------- */

/* The second of a fitting's cases of a name: the same, by what asks for most in full.
 */
static const kent_load_case *second_of(const kent_net *n, const char *id,
                                       const char *name)
{
    return kent_net_case(n, id, name) + 1;
}

/* Of test and surge what asks for more with its factor: 15 bar x 1.0 against 12.75 bar
 * x 1.5, and with soil that may bear half as much again in occasional cases the test;
 * beside it the surge, for what is no soil: joints, and a weight. */
static void what_presses_asks_for_most(void **state)
{
    (void)state;
    for (int more = 0; more < 2; more++) {
        static kent_made t;
        kent_build b = a_cross();
        b.model->loads.test_pressure = 15e5;
        b.model->loads.test_gauge = kent_model_point_index(b.model, "X");
        b.model->loads.factor[KENT_CASE_TEST] = 1.0;
        b.model->loads.bearing_increase[KENT_CASE_OCCASIONAL] = more ? 1.5 : 1.0;
        (void)kent_build_scenario(&b, "surge", 20.0);
        kent_net n = kent_net_of(b);
        t.count = 0;
        kent_made_add(&t, &n, 0.0, 90.0, 0.0);
        kent_made_add(&t, &n, 0.5, 140.0, 0.0);
        kent_made_add(&t, &n, 1.0, 60.0, 0.0);
        kent_made_take(&t, &n, 0, 0.5, 64);
        kent_net_finish(&n);
        const kent_load_case *to = kent_net_case(&n, "X", "closed to N");
        const kent_load_case *from = kent_net_case(&n, "X", "closed from R");
        const double p = more ? 15e5 : RHO * G * 130.0;
        assert_int_equal(to->kind, more ? KENT_CASE_TEST : KENT_CASE_OCCASIONAL);
        assert_int_equal(from->kind, to->kind);
        assert_vector(to->worst[KENT_RESULTANT].balance.thrust, 0.0, p * area(0.32));
        assert_vector(from->worst[KENT_RESULTANT].balance.thrust, p * area(0.32), 0.0);
        if (!more) {
            assert_true(to->worst[KENT_RESULTANT].time == 0.5);
            assert_true(from->worst[KENT_RESULTANT].time == 0.5);
        }
        assert_int_equal(cases_of(&n, "X", "closed to N"), more ? 2 : 1);
        assert_int_equal(cases_of(&n, "X", "closed from R"), more ? 2 : 1);
        static const char *const NAMES[] = {"closed to N", "closed from R"};
        for (int i = 0; i < 2 && more; i++) {
            const kent_load_case *full = second_of(&n, "X", NAMES[i]);
            assert_string_equal(full->name, NAMES[i]);
            assert_int_equal(full->kind, KENT_CASE_OCCASIONAL);
            assert_true(full->increase == 1.5);
            assert_close(full->worst[KENT_RESULTANT].pressure, RHO * G * 130.0, 1e-12);
            assert_true(full->worst[KENT_RESULTANT].time == 0.5);
        }
        assert_true(kent_net_case(&n, "X", "surge")->increase == (more ? 1.5 : 1.0));
        kent_net_clear(&n);
    }
}

/* ---- suction --------------------------------------------------------------------- */

/* Two marches; the second falls lower, to 3 m of head, 7 m below X. A third for
 * comparison alone would fall lower still. */
static kent_net under_suction(double lowest)
{
    static kent_made t;
    static const double HEADS[] = {6.0, 0.0, -2.0};
    kent_build b = a_tee();
    b.model->loads.factor[KENT_CASE_SUCTION] = 1.1;
    (void)kent_build_scenario(&b, "mild", 20.0);
    (void)kent_build_scenario(&b, "hard", 20.0);
    b.model->scenarios[kent_build_scenario(&b, "beside", 20.0)].for_comparison = true;
    kent_net n = kent_net_of(b);
    for (int i = 0; i < 3; i++) {
        t.count = 0;
        kent_made_add(&t, &n, 0.0, 90.0, 0.02);
        kent_made_add(&t, &n, 0.5, i == 1 ? lowest : lowest + HEADS[i], 0.01);
        kent_made_add(&t, &n, 1.0, 95.0, 0.03);
        kent_made_take(&t, &n, i, 0.5, 64);
    }
    kent_net_finish(&n);
    return n;
}

/* The tee is pulled towards its branch, that turns round: with the flow of that
 * instant, one hand-made flow at every place. */
static void suction_is_the_lowest_of_all_marches(void **state)
{
    (void)state;
    kent_net n = under_suction(3.0);
    const kent_load_case *c = kent_net_case(&n, "X", "suction");
    const kent_instant *at = &c->worst[KENT_RESULTANT];
    assert_int_equal(c->kind, KENT_CASE_SUCTION);
    assert_int_equal(c->scenario, 1);
    assert_true(c->safety_factor == 1.1 && at->time == 0.5);
    assert_close(at->pressure, -RHO * G * 7.0, 1e-12);
    assert_true(fabs(fabs(at->balance.port[0].flow) - 0.01) < 1e-15);
    assert_true(at->balance.thrust.y > 0.0); /* under pressure it is pushed south */
    assert_true(thrust(&n, "X", "static").y < 0.0);
    assert_within(at->balance.thrust.y, RHO * G * 7.0 * area(0.32), 30.0);
    kent_net_clear(&n);
}

static void no_suction_no_case(void **state)
{
    (void)state;
    kent_net n = under_suction(10.5); /* "beside" alone falls below */
    assert_int_equal(cases_of(&n, "X", "suction"), 0);
    kent_net_clear(&n);
}

/* ---- the hand calculation -------------------------------------------------------- */

static void every_line_adds_up(void **state)
{
    (void)state;
    static const char *const LEGS[] = {"E", "N"};
    size_t sheets = 0;
    for (int tee = 0; tee < 2; tee++) {
        kent_build b = tee ? a_tee() : a_cross();
        if (tee) closes(&b, LEGS, 2);
        kent_net n = finished(b);
        const int f = kent_build_fitting_of(&n.build, "X");
        const kent_fitting_loads *loads = &n.loads->fittings[f];
        for (size_t k = 0; k < loads->count; k++) {
            kent_derivation d = {0};
            kent_loads_derive(n.model, &n.model->fittings[f], &loads->cases[k],
                              KENT_RESULTANT, &d);
            for (size_t i = 0; i < d.count; i++) {
                char numbers[TEXT], value[TEXT], error[3 * TEXT] = "";
                if (d.lines[i].formula[0] == '\0') continue;
                kent_line_numbers(&d, i, KENT_SI, numbers, sizeof numbers);
                kent_line_value(&d.lines[i], KENT_SI, value, sizeof value);
                if (!kent_arith_agrees(numbers, value, error, sizeof error)) {
                    fail_msg("%s = %s: %s", d.lines[i].symbol, d.lines[i].formula,
                             error);
                }
            }
            const kent_line *x = kent_derivation_find(&d, "T_x");
            assert_true(x &&
                        x->value ==
                            loads->cases[k].worst[KENT_RESULTANT].balance.thrust.x);
            kent_derivation_clear(&d);
            sheets++;
        }
        kent_net_clear(&n);
    }
    assert_true(sheets >= 10);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(each_leg_of_a_cross_is_shut_in_turn),
        cmocka_unit_test(a_leg_supplied_round_a_loop_presses_alone),
        cmocka_unit_test(a_pump_presses_alone),
        cmocka_unit_test(a_case_says_which_legs_close),
        cmocka_unit_test(a_tee_closes_where_it_is_said),
        cmocka_unit_test(the_legs_of_a_wye_are_shut_in_turn),
        cmocka_unit_test(a_run_with_a_dead_branch_is_not_shut),
        cmocka_unit_test(a_cross_in_a_group_is_shut_too),
        cmocka_unit_test(what_presses_asks_for_most),
        cmocka_unit_test(suction_is_the_lowest_of_all_marches),
        cmocka_unit_test(no_suction_no_case),
        cmocka_unit_test(every_line_adds_up),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
