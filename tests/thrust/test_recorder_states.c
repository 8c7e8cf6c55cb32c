/* Marches from several states through one recorder: each is searched with the velocity
 * profile that its own state's friction makes, and kept apart. */
#include "kent_build.h"
#include "kent_check.h"
#include "kent_loads.h"

#include <math.h>
#include <string.h>

enum { SMOOTH, ROUGH, STATES, WATCHES = 8 };

static const double FLOW = 0.3; /* m3/s, of the second instant */
static const double HEAD = 50.0, LEVEL = 0.0;

/* Two instants at every watch: HEAD without flow, then `lower` m less with FLOW. */
static void take_two(kent_recorder *r, int march, double lower)
{
    double head[2 * WATCHES], flow[2 * WATCHES];
    const double time[2] = {0.0, 1.0};
    size_t count = 0;
    (void)kent_recorder_watches(r, &count);
    assert_true(count > 0 && count <= WATCHES);
    for (size_t i = 0; i < count; i++) {
        head[i] = HEAD;
        head[count + i] = HEAD - lower;
        flow[i] = 0.0;
        flow[count + i] = FLOW;
    }
    const kent_trace trace = {
        .count = 2, .watch_count = count, .time = time, .head = head, .flow = flow};
    kent_recorder_start(r, march, 1.0);
    kent_recorder_take(r, march, &trace);
}

/* R - B - E, a bend of 53 degrees at B; "rough" has forty times the friction. */
static kent_build bend_in_two_states(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, LEVEL);
    kent_build_point(&b, "B", 500.0, 0.0, LEVEL);
    kent_build_point(&b, "E", 800.0, 400.0, LEVEL);
    const int p = kent_build_pipe(&b, "A", "R B E", 0.3, 1000.0);
    b.model->pipes[p].friction = KENT_DARCY_FIXED;
    b.model->pipes[p].friction_coefficient = 0.02;
    kent_build_fixed_level(&b, "R", HEAD);
    kent_build_state(&b, "smooth");
    kent_build_state(&b, "rough");
    b.model->states[ROUGH].roughness_factor = 40.0;
    kent_build_scenario(&b, "shut", 1.0);
    kent_build_derive(&b);
    return b;
}

static void each_march_is_searched_with_its_own_profile(void **state)
{
    (void)state;
    kent_build b = bend_in_two_states();
    const kent_model *m = b.model;
    kent_error err = {0};
    kent_steady *of[STATES] = {NULL};
    kent_recorder *r = NULL;
    kent_loads_result *loads = NULL;
    if (kent_steady_solve_states(m, of, &err)) fail_msg("%s", err.what);
    assert_int_equal(kent_recorder_new(m, of, &r, &err), KENT_OK);

    const int bend = kent_build_fitting_of(&b, "B");
    const kent_port *port = &m->ports[m->fittings[bend].port_first];
    double beta[STATES];
    for (int i = 0; i < STATES; i++) {
        beta[i] = kent_port_momentum_factor(of[i]->model, port, FLOW);
    }
    assert_true(beta[ROUGH] > beta[SMOOTH] + 0.05);
    /* p A falls by the mean of beta rho Q2/A (8.1): less than the rough stream's, more
     * than the smooth one's */
    const double bore = acos(-1.0) / 4.0 * 0.09;
    const double seal = acos(-1.0) / 4.0 * port->seal_diameter * port->seal_diameter;
    const double lower =
        0.5 * (beta[SMOOTH] + beta[ROUGH]) * FLOW * FLOW / bore / (m->gravity * seal);
    for (int i = 0; i < STATES; i++) {
        take_two(r, i, lower);
    }
    assert_int_equal(kent_recorder_finish(r, NULL, &loads, &err), KENT_OK);
    size_t seen = 0;
    for (size_t i = 0; i < loads->fittings[bend].count; i++) {
        const kent_load_case *c = &loads->fittings[bend].cases[i];
        if (strcmp(c->name, "shut") != 0) continue;
        seen++;
        assert_true(c->worst[KENT_RESULTANT].time == (c->state == ROUGH ? 1.0 : 0.0));
        assert_string_equal(c->title.s,
                            c->state == ROUGH ? "shut (rough)" : "shut (smooth)");
    }
    assert_int_equal(seen, STATES);
    kent_loads_free(loads);
    kent_recorder_free(r);
    for (int i = 0; i < STATES; i++) {
        kent_steady_free(of[i]);
    }
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(each_march_is_searched_with_its_own_profile),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
