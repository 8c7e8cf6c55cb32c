/* Water that parts in company: of pumps and air valves at nodes solved together, of
 * friction that remembers, of walls that creep. */
#include "march.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

static const double G = 9.80665;
enum { MOST = 512 };

static void set_friction(kent_model *m, kent_surge_friction kind)
{
    for (size_t i = 0; i < m->pipe_count; i++) {
        m->pipes[i].friction = KENT_DARCY_FIXED;
        m->pipes[i].friction_coefficient = 0.018;
    }
    m->solver.friction = kind;
}

/* ---- at nodes where devices stand ------------------------------------------------ */

/* A pump lifts over a summit S with a joint at it and on to a level, and trips. */
static kent_build over_a_summit(kent_separation separation, kent_surge_friction kind,
                                double orifice)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "P", 0.0, 0.0, 0.0);
    kent_build_point(&b, "S", 900.0, 0.0, 40.0);
    kent_build_point(&b, "R", 2000.0, 0.0, 20.0);
    kent_build_pipe(&b, "1", "P S", 0.4, 1000.0);
    kent_build_pipe(&b, "2", "S R", 0.4, 1000.0);
    set_friction(b.model, kind);
    kent_build_fixed_level(&b, "R", 50.0);
    const int p = kent_build_pump(&b, "PS", "P", NULL, 75.0, 0.15, 60.0);
    b.model->pumps[p].suction_level = 3.0;
    b.model->pumps[p].check_valve = KENT_CHECK_IDEAL;
    b.model->pumps[p].inertia = 3.0;
    if (orifice > 0.0) (void)kent_build_air_valve(&b, "AV", "S", orifice, orifice);
    const int s = kent_build_scenario(&b, "trip", 60.0);
    const int e =
        kent_build_ramp(&b, s, KENT_EVENT_PUMP, p, 1.0, (double)NAN, (double)NAN);
    b.model->events[e].action = KENT_TRIP;
    b.model->solver.time_step = 0.01;
    b.model->solver.column_separation = separation;
    return b;
}

typedef struct company {
    size_t parted;         /* instants at which S was hollow */
    double lowest;         /* m over the limit, at S */
    double largest;        /* m3, at S */
    double slowest, least; /* rad/s, and m3/s, of the pump */
} company;

/* At every instant the pump tells what its main carries, and what flows off S is what
 * its cavity grows by, or comes in by the valve there: any step (15.5), any cluster. */
static company march_over(kent_build *b)
{
    const kent_watch at[] = {{0, 0.0}, {0, hypot(900.0, 40.0)}, {1, 0.0}};
    const bool vented = b->model->air_valve_count > 0;
    march m = march_new(b, 60.0, 0, at, 3, 16);
    const double limit = kent_vapour_head(&b->model->water, 40.0, b->model->barometric,
                                          b->model->gravity);
    company is = {.lowest = INFINITY, .slowest = INFINITY, .least = INFINITY};
    double hollow[2][MOST], before[2] = {0.0}, speed = INFINITY;
    kent_trace t;
    kent_error err = {0};
    for (int i = 0; i < 4000; i++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &t, &err), 1);
        const kent_device_row *pump = &t.devices[0];
        kent_marcher_hollow(m.marcher, 0, hollow[0]);
        kent_marcher_hollow(m.marcher, 1, hollow[1]);
        /* later water driven by the suction level alone may turn it */
        if (t.time[0] < 20.0) assert_true(pump->told[0] <= speed);
        speed = pump->told[0];
        const double in = vented ? t.devices[1].flow : 0.0; /* out of S */
        if (i > 0) {
            assert_within(t.flow[0] - pump->flow,
                          (hollow[0][0] - before[0]) / m.grid->step, 1e-9);
        }
        if (i > 0 && before[1] > 0.0 && hollow[1][0] > 0.0) { /* awake */
            assert_within(t.flow[2] - t.flow[1] + in,
                          (hollow[1][0] - before[1]) / m.grid->step, 1e-9);
        }
        before[0] = hollow[0][0];
        before[1] = hollow[1][0];
        if (hollow[1][0] > 1e-6) is.parted++;
        is.largest = fmax(is.largest, hollow[1][0]);
        is.lowest = fmin(is.lowest, t.head[1] - limit);
        is.slowest = fmin(is.slowest, speed);
        is.least = fmin(is.least, pump->flow);
    }
    march_clear(&m);
    return is;
}

static void a_pump_trips_and_the_summit_parts(void **state)
{
    (void)state;
    for (int i = 0; i < 4; i++) {
        kent_build b =
            over_a_summit(i % 2 ? KENT_SEPARATION_GAS : KENT_SEPARATION_VAPOUR,
                          i < 2 ? KENT_SURGE_QUASI_STEADY : KENT_SURGE_UNSTEADY, 0.0);
        const company is = march_over(&b);
        assert_true(is.parted > 100);
        assert_true(is.lowest >= -1e-9 && is.lowest < 0.01);
        assert_true(is.largest > 0.01 && is.largest < 5.0);
        assert_true(is.least > -1e-9 && is.least < 1e-9); /* shut in the end */
        assert_true(is.slowest < 100.0);
        kent_build_clear(&b);
    }
}

/* A large air valve at the summit keeps the water from parting there; a pinhole does
 * not, and then air and vapour are there together. */
static void an_air_valve_and_a_cavity_share_a_node(void **state)
{
    (void)state;
    for (int i = 0; i < 4; i++) {
        const bool pinhole = i < 2;
        kent_build b =
            over_a_summit(i % 2 ? KENT_SEPARATION_GAS : KENT_SEPARATION_VAPOUR,
                          KENT_SURGE_QUASI_STEADY, pinhole ? 0.002 : 0.1);
        const company is = march_over(&b);
        assert_true(pinhole ? is.parted > 100 : is.parted == 0);
        assert_true(pinhole ? is.lowest < 0.01 : is.lowest > 9.0);
        assert_true(is.lowest >= -1e-9);
        kent_build_clear(&b);
    }
}

/* ---- friction beside a cavity ---------------------------------------------------- */

/* Levels at both ends of a hill fall alike, and the water parts at its top: what flows
 * to the left is what flows to the right, and their mean is nil, at which the friction
 * factor of a laminar flow knows no bound. Each side has the friction of its own flow:
 * in a main so short next to none. */
static double parts_at_the_top(kent_surge_friction kind, kent_separation separation)
{
    static const kent_law_point law[] = {{0.0, 40.0}, {6.0, 2.0}};
    kent_build b = kent_build_new();
    kent_build_point(&b, "A", 0.0, 0.0, 0.0);
    kent_build_point(&b, "K", 500.0, 0.0, 30.0);
    kent_build_point(&b, "B", 1000.0, 0.0, 0.0);
    kent_build_pipe(&b, "1", "A K B", 0.5, 1000.0);
    b.model->pipes[0].length = 1000.0;
    for (int i = 0; i < 2; i++) {
        kent_build_fixed_level(&b, i == 0 ? "A" : "B", 40.0);
    }
    set_friction(b.model, kind);
    const int s = kent_build_scenario(&b, "fall", 60.0);
    kent_build_law(&b, s, KENT_EVENT_FIXED_LEVEL, 0, 0.5, law, 2);
    kent_build_law(&b, s, KENT_EVENT_FIXED_LEVEL, 1, 0.5, law, 2);
    b.model->solver.time_step = 0.02;
    b.model->solver.column_separation = separation;
    const kent_watch at[] = {{0, 499.99}, {0, 500.01}};
    march m = march_new(&b, 60.0, 0, at, 2, 1);
    kent_trace t;
    kent_error err = {0};
    double largest = 0.0;
    for (int i = 0; i < 500; i++) {
        double hollow[MOST];
        if (kent_marcher_advance(m.marcher, 1, &t, &err) != 1) fail_msg("%s", err.what);
        assert_within(t.flow[0], -t.flow[1], 1e-9);
        kent_marcher_hollow(m.marcher, 0, hollow);
        largest = fmax(largest, hollow[m.grid->reaches[0] / 2]);
    }
    march_clear(&m);
    kent_build_clear(&b);
    return largest;
}

static void either_side_of_a_cavity_has_its_own_friction(void **state)
{
    (void)state;
    for (int gas = 0; gas < 2; gas++) {
        const kent_separation by = gas ? KENT_SEPARATION_GAS : KENT_SEPARATION_VAPOUR;
        const double none = parts_at_the_top(KENT_SURGE_NONE, by);
        assert_true(none > 0.01);
        assert_close(parts_at_the_top(KENT_SURGE_CONSTANT, by), none, 0.1);
        assert_close(parts_at_the_top(KENT_SURGE_QUASI_STEADY, by), none, 0.1);
        assert_close(parts_at_the_top(KENT_SURGE_UNSTEADY, by), none, 0.1);
    }
}

/* ---- memory ---------------------------------------------------------------------- */

/* D. Covas et al., Journal of Hydraulic Research, 2004 and 2005 (from memory): creep of
 * polyethylene. */
static const kent_creep ELEMENTS[] = {{0.05, 1.057e-10},
                                      {0.5, 1.054e-10},
                                      {1.5, 0.9051e-10},
                                      {5.0, 2.617e-10},
                                      {10.0, 7.456e-10}};
enum { ELEMENT_COUNT = sizeof ELEMENTS / sizeof ELEMENTS[0] };
static const double WALL = 0.0063, LONG = 277.0, BORE = 0.0506, SPEED = 395.0; /* m/s */

/* A level, a line of thick oil that loses some 10 m on the way, and a valve that shuts
 * at once: laminar, so that it comes to rest in a minute. */
static kent_build oil_line(kent_separation separation, kent_surge_friction kind,
                           bool creeps, int reaches)
{
    kent_build b = kent_build_new();
    kent_model *m = b.model;
    m->water.viscosity = 2.3e-5 * m->water.density;
    m->barometric = 15e3; /* so that the water parts in spite of the walls */
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", LONG, 0.0, 0.0);
    const int p = kent_build_pipe(&b, "main", "R E", BORE, SPEED);
    m->pipes[p].friction = KENT_COLEBROOK_WHITE;
    kent_build_fixed_level(&b, "R", 11.0);
    const int v = kent_build_valve(&b, "V", "E", (double)NAN, 0.0);
    m->valves[v].flow = acos(-1.0) * 0.25 * BORE * BORE; /* 1 m/s */
    const int s = kent_build_scenario(&b, "shut", 400.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.0, 0.0, 0.0);
    m->solver.friction = kind;
    m->solver.time_step = LONG / SPEED / reaches;
    m->solver.column_separation = separation;
    if (!creeps) return b;
    m->creep = kent_alloc(ELEMENT_COUNT, sizeof *m->creep);
    assert_non_null(m->creep);
    memcpy(m->creep, ELEMENTS, sizeof ELEMENTS);
    m->creep_count = m->pipes[p].creep_count = ELEMENT_COUNT;
    m->solver.creep = true;
    m->pipes[p].wall = WALL;
    m->pipes[p].outside_diameter = BORE + 2.0 * WALL;
    m->pipes[p].thin_wall = true; /* constraint factor 1 */
    return b;
}

/* m3 that came in by the end, all at rest again; the water parted meanwhile. */
static double came_in(kent_build *b, double *mean_rise)
{
    const kent_watch ends[] = {{0, 0.0}, {0, LONG}};
    march m = march_new(b, 400.0, 0, ends, 2, 1);
    const kent_span *span = &b->model->spans[0];
    const double rest = 11.0; /* m */
    kent_trace trace;
    kent_error err = {0};
    kent_cavity cavity;
    double came = 0.0, last = 0.0, head = 0.0;
    *mean_rise = rest - 0.5 * (m.steady->node_head[span->node[0]] +
                               m.steady->node_head[span->node[1]]);
    for (int step = 0; step * m.grid->step < 400.0; step++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        const double in = trace.flow[0] - trace.flow[1];
        if (step > 0) came += 0.5 * (in + last) * m.grid->step;
        last = in;
        head = trace.head[1];
    }
    assert_within(head, rest, 0.002);
    assert_int_equal(kent_marcher_cavities(m.marcher, &cavity, 1) > 0, 1);
    assert_true(cavity.largest > 1.5e-5 && cavity.collapsed < 60.0);
    march_clear(&m);
    return came;
}

/* What came in after the valve shut is the compliance of water and wall, all elements
 * in full, times the mean rise: whatever cavities opened and closed on the way, and
 * however walls and friction remember. */
static void what_came_in_is_held_whatever_parted(void **state)
{
    (void)state;
    const kent_surge_friction kinds[] = {KENT_SURGE_QUASI_STEADY, KENT_SURGE_UNSTEADY};
    const double elastic = G * 0.25 * acos(-1.0) * BORE * BORE / (SPEED * SPEED);
    double late = 0.0; /* share of elastic */
    for (int i = 0; i < ELEMENT_COUNT; i++) {
        late += ELEMENTS[i].compliance * SPEED * SPEED * 1000.0 * BORE / WALL;
    }
    for (int i = 0; i < 8; i++) {
        const bool creeps = i % 2 == 1;
        const kent_separation by =
            i / 2 % 2 ? KENT_SEPARATION_GAS : KENT_SEPARATION_VAPOUR;
        kent_build b = oil_line(by, kinds[i / 4], creeps, 120);
        double rise = 0.0;
        const double came = came_in(&b, &rise);
        const double held = elastic * (1.0 + (creeps ? late : 0.0)) * LONG * rise;
        assert_close(came, held, 0.003);
        kent_build_clear(&b);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_pump_trips_and_the_summit_parts),
        cmocka_unit_test(an_air_valve_and_a_cavity_share_a_node),
        cmocka_unit_test(what_came_in_is_held_whatever_parted),
        cmocka_unit_test(either_side_of_a_cavity_has_its_own_friction),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
