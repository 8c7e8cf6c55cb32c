/* Legs without a pipe, fittings held as one, curves, and the load cases that they and a
 * later pressure bring: sizes by hand and by textbooks, each with its sign. */
#include "kent_arith.h"
#include "kent_check.h"
#include "kent_net.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

enum { TEXT = 1200 };

static const double PI = 3.14159265358979323846;
static const double RHO = 1000.0, G = 9.80665;
static const double PSI = 6894.757;   /* Pa */
static const double INCH = 0.0254;    /* m */
static const double POUND = 4.448222; /* N */

static const kent_vec3 EAST = {1.0, 0.0, 0.0}, NORTH = {0.0, 1.0, 0.0};
static const kent_vec3 UP = {0.0, 0.0, 1.0};

static double area(double diameter) { return 0.25 * PI * diameter * diameter; }

/* R (level 100 m) - T - E at 10 m along +x, bore 0.3 m, outside 0.32 m; E is dead. */
static kent_build a_main(void)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "T", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 10.0);
    (void)kent_build_pipe(&b, "A", "R T", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "B", "T E", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    return b;
}

/* On the fitting at a point: 0.11 m outside, 0.1 m inside. */
static kent_fitting_note *branch(kent_build *b, const char *at, kent_vec3 direction,
                                 kent_branch_end end, kent_joint joint)
{
    const int index = kent_build_note(b, at); /* the list may move */
    kent_fitting_note *note = &b->model->notes[index];
    note->branch = (kent_branch){.end = end,
                                 .direction = direction,
                                 .outside_diameter = 0.11,
                                 .inside_diameter = 0.10,
                                 .joint = joint};
    return note;
}

static kent_net finished(kent_build b)
{
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    return n;
}

static const kent_instant *worst(const kent_net *n, const char *fitting,
                                 const char *name)
{
    return &kent_net_case(n, fitting, name)->worst[KENT_RESULTANT];
}

static kent_vec3 thrust(const kent_net *n, const char *fitting, const char *name)
{
    return worst(n, fitting, name)->balance.thrust;
}

static bool has_case(const kent_net *n, const char *fitting, const char *name)
{
    const kent_fitting_loads *loads =
        &n->loads->fittings[kent_build_fitting_of(&n->build, fitting)];
    for (size_t i = 0; i < loads->count; i++) {
        if (strcmp(loads->cases[i].name, name) == 0) return true;
    }
    return false;
}

static void assert_vector(kent_vec3 got, double x, double y, double z)
{
    const double near = 1e-9 * (fabs(x) + fabs(y) + fabs(z)) + 1e-9;
    assert_within(got.x, x, near);
    assert_within(got.y, y, near);
    assert_within(got.z, z, near);
}

/* ---- a branch that ends ---------------------------------------------------------- */

/* A flange bolted shut is one body with the tee: nothing as built; p A of the branch,
 * away from it, once a pipe joins. 90 m of water on 0.11 m outside. */
static void a_blank_pushes_only_once_it_is_extended(void **state)
{
    (void)state;
    kent_build b = a_main();
    (void)branch(&b, "T", NORTH, KENT_BRANCH_BLANK, KENT_FLANGED);
    kent_net n = finished(b);
    assert_vector(thrust(&n, "T", "static"), 0.0, 0.0, 0.0);
    assert_vector(thrust(&n, "T", "branch extended"), 0.0, -RHO * G * 90.0 * area(0.11),
                  0.0);
    const kent_load_case *c = kent_net_case(&n, "T", "branch extended");
    assert_true(c->extended && c->kind == KENT_CASE_STATIC);
    assert_false(has_case(&n, "E", "branch extended"));
    kent_net_clear(&n);
}

/* A branch's valve likewise; and it is pressed by what asks for most: the test here. */
static void an_extended_branch_is_pressed_by_the_test(void **state)
{
    (void)state;
    kent_build b = a_main();
    (void)branch(&b, "T", UP, KENT_BRANCH_VALVE, KENT_FLANGED);
    b.model->loads.test_pressure = 15e5;
    b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
    kent_net n = finished(b);
    assert_vector(thrust(&n, "T", "branch extended"), 0.0, 0.0, -15e5 * area(0.11));
    assert_int_equal(kent_net_case(&n, "T", "branch extended")->kind, KENT_CASE_TEST);
    kent_net_clear(&n);
}

/* Where soil may bear three times as much under test, still water sizes a face and the
 * test what is no soil: both are there. */
static void an_extended_branch_is_pressed_by_both(void **state)
{
    (void)state;
    kent_build b = a_main();
    (void)branch(&b, "T", UP, KENT_BRANCH_VALVE, KENT_FLANGED);
    b.model->loads.test_pressure = 15e5;
    b.model->loads.test_gauge = kent_model_point_index(b.model, "T");
    b.model->loads.bearing_increase[KENT_CASE_TEST] = 3.0;
    kent_net n = finished(b);
    const kent_load_case *c = kent_net_case(&n, "T", "branch extended");
    assert_int_equal(c[0].kind, KENT_CASE_STATIC);
    assert_int_equal(c[1].kind, KENT_CASE_TEST);
    assert_string_equal(c[1].name, "branch extended");
    assert_close(c[1].worst[KENT_RESULTANT].pressure, 15e5, 1e-12);
    kent_net_clear(&n);
}

/* And by a surge: 130 m of head, 120 m above T. */
static void an_extended_branch_is_pressed_by_a_peak(void **state)
{
    (void)state;
    static kent_made t;
    kent_build b = a_main();
    (void)branch(&b, "T", NORTH, KENT_BRANCH_BLANK, KENT_FLANGED);
    (void)kent_build_scenario(&b, "surge", 20.0);
    kent_net n = kent_net_of(b);
    t.count = 0;
    kent_made_add(&t, &n, 0.0, 90.0, 0.0);
    kent_made_add(&t, &n, 0.5, 130.0, 0.0);
    kent_made_add(&t, &n, 1.0, 70.0, 0.0);
    kent_made_take(&t, &n, 0, 0.5, 64);
    kent_net_finish(&n);
    const kent_load_case *c = kent_net_case(&n, "T", "branch extended");
    assert_vector(thrust(&n, "T", "branch extended"), 0.0,
                  -RHO * G * 120.0 * area(0.11), 0.0);
    assert_int_equal(c->scenario, 0);
    assert_true(c->worst[KENT_RESULTANT].time == 0.5);
    kent_net_clear(&n);
}

/* A cap beyond a joint that slips is another body: the tee is pushed as built, and by
 * flow past it the dead branch has the whole head: p + rho V2/2. */
static void a_cap_that_slips_leaves_the_tee_pushed(void **state)
{
    (void)state;
    kent_build b = a_main();
    (void)branch(&b, "T", NORTH, KENT_BRANCH_BLANK, KENT_PUSH_ON);
    (void)kent_build_outflow(&b, "E", 0.1);
    kent_net n = finished(b);
    assert_vector(thrust(&n, "T", "static"), 0.0, -RHO * G * 90.0 * area(0.11), 0.0);
    assert_false(has_case(&n, "T", "branch extended"));
    const double speed = 0.1 / area(0.3);
    const kent_instant *i = worst(&n, "T", "steady");
    assert_close(i->balance.port[2].pressure,
                 i->balance.port[0].pressure + 0.5 * RHO * speed * speed, 1e-12);
    assert_true(i->balance.port[2].flow == 0.0);
    assert_close(i->balance.thrust.y, -i->balance.port[2].pressure * area(0.11), 1e-12);
    kent_net_clear(&n);
}

/* ---- an open end ----------------------------------------------------------------- */

/* A hydrant at the pipe's end, in line with it: a textbook's nozzle, pressure on the
 * bore. The books' streams are uniform, so the water here is next to inviscid. head: m
 * at the inlet with the flow running. */
static kent_build nozzle(double bore, double outlet, double density, double pressure,
                         double flow)
{
    kent_build b = kent_build_new();
    const double speed = flow / area(bore);
    const double level =
        pressure / (density * G) + speed * speed / (2.0 * G); /* at the inlet */
    (void)kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    (void)kent_build_point(&b, "N", 50.0, 0.0, 0.0);
    const int pipe = kent_build_pipe(&b, "A", "R N", bore, 1000.0);
    b.model->pipes[pipe].joint = KENT_FLANGED;
    (void)kent_build_fixed_level(&b, "R", level);
    (void)kent_build_outflow(&b, "N", flow);
    b.model->water.density = density;
    b.model->water.viscosity = 1e-12;
    kent_fitting_note *note = branch(&b, "N", EAST, KENT_BRANCH_OPEN, KENT_FLANGED);
    note->role = KENT_ROLE_HYDRANT;
    note->branch.outside_diameter = note->branch.inside_diameter = outlet;
    return b;
}

/* Munson, Young and Okiishi, Ex 5.11 (p 208): 16 to 5 mm, 0.6 L/s, 464 kPa; the anchor
 * holds 77.8 N, of which 0.1 kg of nozzle weigh 0.98 and the water in it 0.03. */
static void the_tap_nozzle_of_munson(void **state)
{
    (void)state;
    kent_net n = finished(nozzle(0.016, 0.005, 999.0, 464e3, 0.6e-3));
    assert_close(thrust(&n, "N", "steady").x + 0.981 + 0.028, 77.8, 0.002);
    assert_int_equal(kent_net_fitting(&n, "N")->port_count, 2);
    kent_net_clear(&n);
}

/* de Nevers, Ex 7.5 and 7.6 (p 254): 10 to 1 square inch at 100 psi, density 62.3
 * lb/ft3. Shut, the flange holds 1000 lbf; open, 181.8 less. */
static void the_nozzle_of_de_nevers_open_and_shut(void **state)
{
    (void)state;
    const double wide = sqrt(4.0 * 10.0 / PI) * INCH, narrow = sqrt(4.0 / PI) * INCH;
    const double density = 62.3 * 0.45359237 / (0.3048 * 0.3048 * 0.3048);
    const double jet = sqrt(2.0 * 100.0 * PSI / density / (1.0 - 0.01)); /* m/s */
    const double flow = jet * area(narrow);
    kent_build b = nozzle(wide, narrow, density, 100.0 * PSI, flow);
    b.model->loads.static_level = 100.0 * PSI / (density * G);
    kent_net n = finished(b);
    assert_close(thrust(&n, "N", "static").x, 1000.0 * POUND, 1e-6);
    assert_close(thrust(&n, "N", "steady").x, 818.2 * POUND, 0.002);
    assert_false(has_case(&n, "N", "branch extended")); /* bolted to the end */
    kent_net_clear(&n);
}

static kent_build hydrant_on_a_run(kent_joint joint)
{
    kent_build b = a_main();
    branch(&b, "T", UP, KENT_BRANCH_OPEN, joint)->role = KENT_ROLE_HYDRANT;
    (void)kent_build_outflow(&b, "T", 0.02);
    return b;
}

/* Drawing 20 L/s upwards presses the tee down by the jet, and the run that brings them
 * adds its own along x; shut, nothing is left of either as built. */
static void a_hydrant_presses_its_tee_away_from_the_jet(void **state)
{
    (void)state;
    kent_net n = finished(hydrant_on_a_run(KENT_FLANGED));
    const kent_instant *i = worst(&n, "T", "steady");
    const kent_port_state *p = i->balance.port;
    assert_true(p[2].pressure == 0.0);
    assert_close(p[2].flow, 0.02, 1e-9);
    assert_close(p[0].flow, -0.02, 1e-9);
    assert_close(i->balance.thrust.z,
                 -p[2].momentum_factor * RHO * 0.02 * 0.02 / area(0.10), 1e-9);
    const double speed = 0.02 / area(0.3);
    assert_close(i->balance.thrust.x,
                 RHO * speed * speed * (p[0].momentum_factor * area(0.3)) -
                     0.5 * RHO * speed * speed * area(0.32),
                 1e-6);
    assert_vector(thrust(&n, "T", "static"), 0.0, 0.0, 0.0);
    assert_vector(thrust(&n, "T", "branch extended"), 0.0, 0.0,
                  -RHO * G * 90.0 * area(0.11));
    kent_net_clear(&n);
}

/* The search for the worst instant sees the jet: one head, more and less drawn. */
static void the_worst_instant_of_a_hydrant_is_where_most_is_drawn(void **state)
{
    (void)state;
    static kent_made t;
    kent_build b = hydrant_on_a_run(KENT_FLANGED);
    (void)kent_build_scenario(&b, "drawn", 20.0);
    kent_net n = kent_net_of(b);
    const double from_west[] = {0.010, 0.030, 0.050, 0.020};
    const double on_east[] = {0.0, 0.001, 0.045, -0.015}; /* drawn: the difference */
    t.count = 0;
    for (size_t row = 0; row < 4; row++) {
        kent_made_add(&t, &n, 0.5 * (double)row, 95.0, 0.0);
        for (size_t w = 0; w < n.watch_count; w++) {
            const bool west = n.watches[w].span == kent_build_span_of(&n.build, "A");
            t.flow[row * n.watch_count + w] = west ? from_west[row] : on_east[row];
        }
    }
    kent_made_take(&t, &n, 0, 0.5, 2);
    kent_net_finish(&n);
    const kent_load_case *c = kent_net_case(&n, "T", "drawn");
    const kent_instant *down = &c->worst[KENT_DOWNWARD];
    assert_true(down->time == 1.5); /* 35 L/s */
    assert_close(down->balance.port[2].flow, 0.035, 1e-12);
    assert_close(down->balance.thrust.z,
                 -down->balance.port[2].momentum_factor * RHO * 0.035 * 0.035 /
                     area(0.10),
                 1e-12);
    kent_net_clear(&n);
}

/* Shut beyond a joint that slips, the hydrant pushes the pipe's end as a branch. */
static void a_hydrant_beyond_a_joint_that_slips_is_also_held_shut(void **state)
{
    (void)state;
    kent_build b = a_main();
    branch(&b, "E", UP, KENT_BRANCH_OPEN, KENT_PUSH_ON)->role = KENT_ROLE_HYDRANT;
    (void)kent_build_outflow(&b, "E", 0.02);
    kent_net n = finished(b);
    const double p = RHO * G * 90.0;
    assert_vector(thrust(&n, "E", "static"), p * area(0.32), 0.0, 0.0);
    assert_vector(thrust(&n, "E", "branch extended"), p * area(0.32), 0.0,
                  -p * area(0.11));
    kent_net_clear(&n);
}

/* ---- branches with pipes --------------------------------------------------------- */

/* A wye: p A of the branch along its axis, away from it, over a straight run. */
static void a_wye_is_pushed_along_its_branch(void **state)
{
    (void)state;
    kent_build b = a_main();
    (void)kent_build_point(&b, "W", 150.0, 50.0, 10.0);
    (void)kent_build_pipe(&b, "C", "T W", 0.2, 1000.0);
    kent_net n = finished(b);
    const double force = RHO * G * 90.0 * area(0.22);
    assert_int_equal(kent_net_fitting(&n, "T")->type, KENT_WYE);
    assert_vector(thrust(&n, "T", "static"), -force * sqrt(0.5), -force * sqrt(0.5),
                  0.0);
    kent_net_clear(&n);
}

/* ---- a pressure expected later --------------------------------------------------- */

static void a_later_pressure_is_a_case_of_its_own(void **state)
{
    (void)state;
    kent_build b = a_main();
    b.model->points[2].at.z = 4.0; /* E: 6 m below T */
    b.model->loads.future_pressure = 14e5;
    b.model->loads.future_gauge = kent_model_point_index(b.model, "T");
    b.model->loads.factor[KENT_CASE_STATIC] = 1.7;
    (void)kent_build_scenario(&b, "surge", 20.0);
    kent_net n = finished(b);
    const kent_load_case *c = kent_net_case(&n, "E", "future");
    const double axis = hypot(100.0, 6.0);
    const double force = (14e5 + RHO * G * 6.0) * area(0.32);
    assert_vector(thrust(&n, "E", "future"), force * 100.0 / axis, 0.0,
                  -force * 6.0 / axis);
    assert_true(c->later && c->safety_factor == 1.7);
    const kent_load_case *cases =
        n.loads->fittings[kent_build_fitting_of(&n.build, "E")].cases;
    assert_string_equal(cases[1].name, "steady"); /* no test here */
    assert_string_equal(cases[2].name, "future");
    assert_false(has_case(&n, "E", "test"));
    kent_net_clear(&n);
}

/* What flows in beyond a valve keeps a higher head there than still water would. */
static void a_closed_valve_is_also_held_against_steady_flow(void **state)
{
    (void)state;
    kent_build b = a_main();
    const int valve = kent_build_valve(&b, "V", "T", 0.05, (double)NAN);
    b.model->valves[valve].size = 0.3;
    (void)kent_build_outflow(&b, "E", -0.1); /* 2 m of loss through the valve */
    kent_net n = finished(b);
    const kent_load_case *west = kent_net_case(&n, "T", "closed from R");
    const kent_load_case *east = kent_net_case(&n, "T", "closed from E");
    assert_int_equal(west->kind, KENT_CASE_STATIC);
    assert_int_equal(east->kind, KENT_CASE_STEADY);
    assert_int_equal(east->state, 0);
    const double head = n.steady->node_head[n.model->valves[0].node[1]];
    assert_true(head > 101.0);
    assert_vector(thrust(&n, "T", "closed from E"),
                  -RHO * G * (head - 10.0) * area(0.32), 0.0, 0.0);
    kent_net_clear(&n);
}

static void a_closed_valve_is_also_held_against_the_later_pressure(void **state)
{
    (void)state;
    kent_build b = a_main();
    (void)kent_build_valve(&b, "V", "T", 0.05, (double)NAN);
    b.model->loads.future_pressure = 14e5;
    b.model->loads.future_gauge = kent_model_point_index(b.model, "E");
    kent_net n = finished(b);
    const kent_load_case *c = kent_net_case(&n, "T", "closed from R");
    assert_true(c->later);
    assert_vector(thrust(&n, "T", "closed from R"), 14e5 * area(0.32), 0.0, 0.0);
    kent_net_clear(&n);
}

/* ---- factors --------------------------------------------------------------------- */

static double factor_of_test(double kind, double all, double rules_test)
{
    kent_build b = a_main();
    b.model->loads.test_pressure = 15e5;
    b.model->loads.factor[KENT_CASE_TEST] = isnan(kind) ? all : kind;
    b.model->loads.factor[KENT_CASE_STATIC] = all;
    b.model->rules.safety_factor = 1.5;
    b.model->rules.factor_test = rules_test;
    kent_net n = finished(b);
    const double factor = kent_net_case(&n, "E", "test")->safety_factor;
    const double rest = kent_net_case(&n, "E", "static")->safety_factor;
    assert_true(rest == (isnan(all) ? 1.5 : all));
    kent_net_clear(&n);
    return factor;
}

static void the_factor_of_the_test_is_the_nearest_one_stated(void **state)
{
    (void)state;
    const double no = (double)NAN;
    assert_true(factor_of_test(1.1, 1.4, 1.25) == 1.1);
    assert_true(factor_of_test(no, 1.4, 1.25) == 1.4);
    assert_true(factor_of_test(no, no, 1.25) == 1.25);
    assert_true(factor_of_test(no, no, no) == 1.5);
}

/* ---- several as one, and curves -------------------------------------------------- */

/* Two 45 degree bends, left then right, `gap` m apart on welded pipe of 0.3 m; rise:
 * the second lies this much higher. */
static kent_build offset(double gap, double rise)
{
    kent_build b = kent_build_new();
    const double s = gap * sqrt(0.5);
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "P", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "Q", 100.0 + s, rise > 0.0 ? 0.0 : s, 10.0 + rise);
    (void)kent_build_point(&b, "E", 200.0 + s, rise > 0.0 ? 0.0 : s, 10.0 + rise);
    const int pipe = kent_build_pipe(&b, "A", "R P Q E", 0.3, 1000.0);
    b.model->pipes[pipe].joint = KENT_WELDED;
    (void)kent_build_fixed_level(&b, "R", 100.0);
    return b;
}

static kent_derivation derived(const kent_net *n, const char *fitting, const char *name)
{
    kent_derivation d = {0};
    kent_loads_derive(n->model, kent_net_fitting(n, fitting),
                      kent_net_case(n, fitting, name), KENT_RESULTANT, &d);
    return d;
}

static double value_of(const kent_derivation *d, const char *symbol)
{
    const kent_line *line = kent_derivation_find(d, symbol);
    if (!line) fail_msg("there is no line \"%s\"", symbol);
    return line ? line->value : (double)NAN;
}

/* An offset of 1.2 m at 45 degrees: no thrust, but p A x 0.8485 m in plan. */
/* Two mains side by side, still water at 60 m and at 80 m: both bends are taken under
 * the 30 m of water over 50 m that the higher one brings, whichever is named first. */
static void still_water_of_the_higher_main_counts_for_both(void **state)
{
    (void)state;
    for (int first = 0; first < 2; first++) {
        kent_build b = kent_build_new();
        (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
        (void)kent_build_point(&b, "B", 0.0, 0.0, 50.0);
        (void)kent_build_point(&b, "C", 0.0, 200.0, 50.0);
        (void)kent_build_point(&b, "P", -200.0, -0.5, 50.0);
        (void)kent_build_point(&b, "Q", 0.5, -0.5, 50.0);
        (void)kent_build_point(&b, "E", 0.5, 200.0, 50.0);
        (void)kent_build_pipe(&b, "M", "A B C", 0.2, 1000.0);
        (void)kent_build_pipe(&b, "N", "P Q E", 0.2, 1000.0);
        kent_build_fixed_level(&b, "A", first ? 80.0 : 60.0);
        kent_build_fixed_level(&b, "P", first ? 60.0 : 80.0);
        (void)kent_build_outflow(&b, "C", 0.0);
        (void)kent_build_outflow(&b, "E", 0.0);
        const int note = kent_build_note(&b, "B");
        b.model->together = kent_alloc(1, sizeof *b.model->together);
        assert_non_null(b.model->together);
        b.model->together[0] = 4;
        b.model->together_count = b.model->notes[note].together_count = 1;
        kent_net n = kent_net_of(b);
        kent_net_finish(&n);
        const kent_load_case *c = kent_net_case(&n, "B", "static");
        const double weight = n.model->water.density * n.model->gravity;
        assert_close(c->worst[KENT_RESULTANT].pressure, weight * 30.0, 1e-12);
        kent_net_clear(&n);
    }
}

static void a_level_offset_leaves_its_couple(void **state)
{
    (void)state;
    kent_net n = finished(offset(1.2, 0.0));
    const kent_fitting *f = kent_net_fitting(&n, "P");
    assert_int_equal(f->type, KENT_GROUP);
    const kent_instant *i = worst(&n, "P", "static");
    const double push = RHO * G * 90.0 * area(0.3);
    const kent_vec3 couple = kent_instant_couple(n.model, f, i);
    assert_vector(i->balance.thrust, 0.0, 0.0, 0.0);
    /* pushed east at y = 0 and west at y = 0.8485: anticlockwise from above */
    assert_close(couple.z, push * 1.2 * sqrt(0.5), 1e-9);
    assert_within(couple.x, 0.0, 1e-6);
    assert_within(couple.y, 0.0, 1e-6);
    kent_derivation d = derived(&n, "P", "static");
    assert_close(value_of(&d, "M"), push * 1.2 * sqrt(0.5), 1e-9);
    assert_close(value_of(&d, "M_plan"), push * 1.2 * sqrt(0.5), 1e-9);
    assert_close(value_of(&d, "e"), 1.2 * sqrt(0.5), 1e-9);
    kent_derivation_clear(&d);
    kent_net_clear(&n);
}

/* Upright, with the second leg 0.8485 m higher: it has 0.8485 m of water less, which
 * leaves rho g 0.8485 A along the axis, towards the higher leg. */
static void an_upright_offset_has_a_pressure_at_each_level(void **state)
{
    (void)state;
    const double rise = 1.2 * sqrt(0.5);
    kent_net n = finished(offset(1.2, rise));
    const kent_instant *i = worst(&n, "P", "static");
    const kent_fitting *f = kent_net_fitting(&n, "P");
    assert_close(i->balance.port[0].pressure, RHO * G * 90.0, 1e-12);
    assert_close(i->balance.port[1].pressure, RHO * G * (90.0 - rise), 1e-12);
    assert_close(i->pressure, RHO * G * (90.0 - 0.5 * rise), 1e-12);
    assert_close(i->balance.thrust.x, RHO * G * rise * area(0.3), 1e-9);
    /* about the y axis: both pushes tip the top towards R */
    const double arm = 0.5 * rise;
    const double turn = RHO * G * (180.0 - rise) * area(0.3) * arm;
    const kent_vec3 couple = kent_instant_couple(n.model, f, i);
    assert_close(couple.y, -turn, 1e-9);
    const kent_instant *flow = worst(&n, "P", "steady");
    assert_close(flow->pressure, i->pressure, 1e-12); /* nothing flows */
    kent_net_clear(&n);
}

/* Two bends the same way are one of their whole turn: 90 degrees, 2 p A sin 45. */
static void two_bends_one_way_are_one_of_the_whole_turn(void **state)
{
    (void)state;
    kent_build b = offset(1.2, 0.0);
    const double s = 1.2 * sqrt(0.5);
    b.model->points[3].at = (kent_vec3){100.0 + s, s + 100.0, 10.0};
    kent_net n = finished(b);
    const double p = RHO * G * 90.0;
    assert_int_equal(kent_net_fitting(&n, "P")->type, KENT_GROUP);
    assert_vector(thrust(&n, "P", "static"), p * area(0.3), -p * area(0.3), 0.0);
    kent_derivation d = derived(&n, "P", "static");
    assert_close(value_of(&d, "C"), 2.0 * p * area(0.3) * sin(PI / 4.0), 1e-9);
    kent_derivation_clear(&d);
    kent_net_clear(&n);
}

/* A curve of 200 m radius that turns by 20 degrees: 2 p A sin 10 in all, and p A / 200
 * on each metre; over the arc of 69.81 m the chord of those is the whole again. */
static void a_curve_is_a_bend_spread_along_it(void **state)
{
    (void)state;
    const double turn = 20.0 * PI / 180.0;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "P", 200.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 200.0 + 200.0 * cos(turn), 200.0 * sin(turn), 10.0);
    (void)kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    kent_net n = finished(b);
    const double push = RHO * G * 90.0 * area(0.32);
    kent_fitting *f = &b.model->fittings[kent_build_fitting_of(&n.build, "P")];
    f->type = KENT_CURVE; /* the legs of the bend it was found as */
    f->curve_radius = 200.0;
    assert_close(kent_vec3_length(thrust(&n, "P", "static")),
                 2.0 * push * sin(0.5 * turn), 1e-9);
    assert_true(thrust(&n, "P", "static").y < 0.0); /* outwards, off a left turn */
    kent_derivation d = derived(&n, "P", "static");
    assert_close(value_of(&d, "C"), 2.0 * push * sin(0.5 * turn), 1e-9);
    assert_close(value_of(&d, "q"), push / 200.0, 1e-9);
    const double chord = 2.0 * 200.0 * sin(0.5 * turn);
    assert_close(value_of(&d, "q") * chord, value_of(&d, "T"), 1e-9);
    kent_derivation_clear(&d);
    kent_net_clear(&n);
}

/* ---- the hand calculation, and more cases ---------------------------------------- */

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

/* Every case of every fitting, in both sets of units; returns how many. */
static size_t every_sheet_adds_up(kent_build b)
{
    static kent_made t;
    size_t sheets = 0;
    b.model->loads.test_pressure = 15e5;
    b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
    b.model->loads.future_pressure = 14e5;
    b.model->loads.future_gauge = kent_model_point_index(b.model, "R");
    (void)kent_build_scenario(&b, "surge", 20.0);
    kent_net n = kent_net_of(b);
    t.count = 0;
    kent_made_add(&t, &n, 0.0, 90.0, 0.031);
    kent_made_add(&t, &n, 0.5, 161.7, 0.0173);
    kent_made_take(&t, &n, 0, 0.5, 64);
    kent_net_finish(&n);
    for (size_t i = 0; i < n.loads->fitting_count; i++) {
        for (size_t k = 0; k < n.loads->fittings[i].count; k++) {
            const kent_load_case *c = &n.loads->fittings[i].cases[k];
            kent_derivation d = {0};
            kent_loads_derive(n.model, &n.model->fittings[i], c, KENT_RESULTANT, &d);
            assert_adds_up(&d, KENT_SI);
            assert_adds_up(&d, KENT_US);
            assert_true(value_of(&d, "T_x") ==
                        c->worst[KENT_RESULTANT].balance.thrust.x);
            assert_true(value_of(&d, "T_z") ==
                        c->worst[KENT_RESULTANT].balance.thrust.z);
            kent_derivation_clear(&d);
            sheets++;
        }
    }
    kent_net_clear(&n);
    return sheets;
}

static void every_line_of_these_fittings_adds_up(void **state)
{
    (void)state;
    kent_build blank = a_main(), cap = a_main(), end = a_main();
    (void)branch(&blank, "T", NORTH, KENT_BRANCH_BLANK, KENT_FLANGED);
    (void)branch(&cap, "T", NORTH, KENT_BRANCH_BLANK, KENT_PUSH_ON);
    branch(&end, "E", UP, KENT_BRANCH_OPEN, KENT_PUSH_ON)->role = KENT_ROLE_HYDRANT;
    (void)kent_build_outflow(&end, "E", 0.02);
    size_t sheets =
        every_sheet_adds_up(blank) + every_sheet_adds_up(cap) +
        every_sheet_adds_up(end) + every_sheet_adds_up(hydrant_on_a_run(KENT_FLANGED)) +
        every_sheet_adds_up(offset(1.2, 0.7)) + every_sheet_adds_up(offset(1.2, 0.0));
    assert_true(sheets > 40);
}

/* N: the largest factored thrust of a fitting. */
static double asked(const kent_net *n, size_t fitting)
{
    const kent_fitting_loads *loads = &n->loads->fittings[fitting];
    double most = 0.0;
    for (size_t i = 0; i < loads->count; i++) {
        const kent_load_case *c = &loads->cases[i];
        if (!c->worst[KENT_RESULTANT].set) continue;
        most =
            fmax(most, c->safety_factor *
                           kent_vec3_length(c->worst[KENT_RESULTANT].balance.thrust));
    }
    return most;
}

enum { STAGES = 4, KINDS = 3 };

/* One more kind of case with each stage: later pressure, test, surge. */
static void largest_thrusts(int stage, unsigned seed, double out[KINDS])
{
    static const char *const IDS[KINDS] = {"T", "V", "E"};
    static kent_made t;
    kent_build b = a_main();
    (void)kent_build_point(&b, "V", 50.0, 0.0, 10.0);
    b.model->points[3].at = (kent_vec3){300.0, 10.0, 12.0};
    (void)kent_build_point(&b, "Z", 400.0, 10.0, 12.0);
    (void)kent_build_pipe(&b, "C", "E V Z", 0.3, 1000.0);
    (void)branch(&b, "T", NORTH, KENT_BRANCH_BLANK, KENT_FLANGED);
    (void)kent_build_valve(&b, "VV", "V", 0.05, (double)NAN);
    b.model->loads.factor[KENT_CASE_TEST] = 1.0 + 0.1 * (seed % 7);
    b.model->loads.factor[KENT_CASE_STATIC] = 1.0 + 0.1 * (seed % 5);
    b.model->loads.factor[KENT_CASE_OCCASIONAL] = 1.0 + 0.1 * (seed % 3);
    if (stage > 0) {
        b.model->loads.future_pressure = 1e5 * (double)(seed % 17);
        b.model->loads.future_gauge = kent_model_point_index(b.model, "E");
    }
    if (stage > 1) {
        b.model->loads.test_pressure = 1e5 * (double)(seed % 19);
        b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
    }
    (void)kent_build_scenario(&b, "surge", 20.0);
    kent_net n = kent_net_of(b);
    if (stage > 2) {
        t.count = 0;
        kent_made_add(&t, &n, 0.0, 40.0 + (double)(seed % 131), 0.001 * (seed % 11));
        kent_made_add(&t, &n, 0.5, (double)(seed % 23), 0.0);
        kent_made_take(&t, &n, 0, 0.5, 64);
    }
    kent_net_finish(&n);
    for (size_t k = 0; k < KINDS; k++) {
        out[k] = asked(&n, (size_t)kent_build_fitting_of(&n.build, IDS[k]));
    }
    kent_net_clear(&n);
}

static void one_more_case_never_lowers_a_design_thrust(void **state)
{
    (void)state;
    size_t grown = 0;
    for (unsigned seed = 0; seed < 60; seed++) {
        double before[KINDS] = {0.0}, after[KINDS] = {0.0};
        largest_thrusts(0, seed * 37, before);
        for (int stage = 1; stage < STAGES; stage++) {
            largest_thrusts(stage, seed * 37, after);
            for (size_t k = 0; k < KINDS; k++) {
                assert_true(after[k] >= before[k] * (1.0 - 1e-8));
                grown += after[k] > before[k] * (1.0 + 1e-6);
            }
            memcpy(before, after, sizeof before);
        }
    }
    assert_true(grown > 20); /* what is added does count, here and there */
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_blank_pushes_only_once_it_is_extended),
        cmocka_unit_test(an_extended_branch_is_pressed_by_the_test),
        cmocka_unit_test(an_extended_branch_is_pressed_by_both),
        cmocka_unit_test(an_extended_branch_is_pressed_by_a_peak),
        cmocka_unit_test(a_cap_that_slips_leaves_the_tee_pushed),
        cmocka_unit_test(the_tap_nozzle_of_munson),
        cmocka_unit_test(the_nozzle_of_de_nevers_open_and_shut),
        cmocka_unit_test(a_hydrant_presses_its_tee_away_from_the_jet),
        cmocka_unit_test(the_worst_instant_of_a_hydrant_is_where_most_is_drawn),
        cmocka_unit_test(a_hydrant_beyond_a_joint_that_slips_is_also_held_shut),
        cmocka_unit_test(a_wye_is_pushed_along_its_branch),
        cmocka_unit_test(a_later_pressure_is_a_case_of_its_own),
        cmocka_unit_test(a_closed_valve_is_also_held_against_steady_flow),
        cmocka_unit_test(a_closed_valve_is_also_held_against_the_later_pressure),
        cmocka_unit_test(the_factor_of_the_test_is_the_nearest_one_stated),
        cmocka_unit_test(still_water_of_the_higher_main_counts_for_both),
        cmocka_unit_test(a_level_offset_leaves_its_couple),
        cmocka_unit_test(an_upright_offset_has_a_pressure_at_each_level),
        cmocka_unit_test(two_bends_one_way_are_one_of_the_whole_turn),
        cmocka_unit_test(a_curve_is_a_bend_spread_along_it),
        cmocka_unit_test(every_line_of_these_fittings_adds_up),
        cmocka_unit_test(one_more_case_never_lowers_a_design_thrust),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
