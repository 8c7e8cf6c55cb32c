#include "kent_balance.h"
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
static const kent_vec3 WEST = {-1.0, 0.0, 0.0}, EAST = {1.0, 0.0, 0.0};
static const kent_vec3 NORTH = {0.0, 1.0, 0.0};

/* The balance of given ports, as they state pressure, flow and momentum factor. */
static kent_balance balance_of(const kent_port *ports, size_t count)
{
    kent_balance b = {0};
    for (size_t i = 0; i < count; i++) {
        b.port[i].pressure = ports[i].pressure;
        b.port[i].flow = ports[i].flow;
        b.port[i].momentum_factor = ports[i].momentum_factor;
    }
    kent_balance_sum(ports, count, 1000.0, &b);
    return b;
}

static void a_tee_is_pushed_away_from_its_branch(void **state)
{
    (void)state;
    const kent_port tee[3] = {kent_build_port(WEST, 8e5, 0.0, 0.4),
                              kent_build_port(EAST, 8e5, 0.0, 0.4),
                              kent_build_port(NORTH, 8e5, 0.0, 0.2)};
    const kent_vec3 t = balance_of(tee, 3).thrust;
    assert_close(t.y, -8e5 * 0.25 * PI * 0.2 * 0.2, 1e-12);
    assert_true(t.x == 0.0);
}

static void a_reducer_is_pushed_towards_its_small_end(void **state)
{
    (void)state;
    const kent_port reducer[2] = {kent_build_port(WEST, 8e5, 0.0, 0.4),
                                  kent_build_port(EAST, 8e5, 0.0, 0.3)};
    const double area = 0.25 * PI * (0.4 * 0.4 - 0.3 * 0.3);
    assert_close(balance_of(reducer, 2).thrust.x, 8e5 * area, 1e-12);
}

static void suction_pulls_every_one_the_other_way(void **state)
{
    (void)state;
    for (int k = 0; k < 20; k++) {
        kent_port ports[3] = {kent_build_port(WEST, 8e5, 0.0, 0.4),
                              kent_build_port(EAST, 7e5 + 1e4 * k, 0.0, 0.3),
                              kent_build_port(NORTH, 8e5, 0.0, 0.1 + 0.01 * k)};
        const kent_vec3 push = balance_of(ports, 3).thrust;
        for (size_t i = 0; i < 3; i++) {
            ports[i].pressure = -ports[i].pressure;
        }
        const kent_vec3 pull = balance_of(ports, 3).thrust;
        assert_true(push.x == -pull.x && push.y == -pull.y);
    }
}

static void a_straight_fitting_at_rest_has_no_thrust(void **state)
{
    (void)state;
    for (int k = 0; k < 100; k++) { /* whichever way it points */
        const double turn = 0.0628 * k;
        const kent_vec3 out = {cos(turn) * 0.8, sin(turn) * 0.8, 0.6};
        const kent_port ports[2] = {
            kent_build_port(kent_vec3_scale(-1.0, out), 12.34e5, 0.0, 0.6),
            kent_build_port(out, 12.34e5, 0.0, 0.6)};
        const kent_vec3 t = balance_of(ports, 2).thrust;
        assert_true(t.x == 0.0 && t.y == 0.0 && t.z == 0.0);
    }
}

static void a_stream_pushes_the_same_whichever_way_it_flows(void **state)
{
    (void)state;
    kent_port bend[2] = {kent_build_port(WEST, 5e5, -0.5, 0.5),
                         kent_build_port(NORTH, 5e5, 0.5, 0.5)};
    const kent_vec3 there = balance_of(bend, 2).thrust;
    bend[0].flow = 0.5;
    bend[1].flow = -0.5;
    const kent_vec3 back = balance_of(bend, 2).thrust;
    assert_true(there.x == back.x && there.y == back.y);
    assert_true(there.x > 5e5 * 0.25 * PI * 0.25); /* and more than at rest */
}

static void pressure_acts_on_the_seal_and_momentum_on_the_bore(void **state)
{
    (void)state;
    kent_port end = kent_build_port(WEST, 5e5, 0.2, 0.4);
    end.seal_diameter = 0.429;
    end.momentum_factor = 1.02;
    const kent_balance b = balance_of(&end, 1);
    const double seal = 0.25 * PI * 0.429 * 0.429, bore = 0.25 * PI * 0.4 * 0.4;
    assert_close(b.port[0].pressure_force, 5e5 * seal, 1e-14);
    assert_close(b.port[0].momentum_flux, 1.02 * 1000.0 * 0.04 / bore, 1e-14);
    assert_close(b.port[0].push, b.port[0].pressure_force + b.port[0].momentum_flux,
                 1e-14);
    assert_close(b.thrust.x, b.port[0].push, 1e-14);
}

static void weight_and_changing_flow_have_rows_of_their_own(void **state)
{
    (void)state;
    kent_port ports[2] = {kent_build_port(WEST, 0.0, 0.0, 0.5),
                          kent_build_port(NORTH, 0.0, 0.0, 0.5)};
    kent_balance b = {.weight = {0.0, 0.0, -3000.0}};
    ports[0].face = 0.7;
    ports[1].face = 0.9;
    b.port[0].flow_rate = 0.02; /* inflow dying away: less and less negative */
    b.port[1].flow_rate = -0.02;
    kent_balance_sum(ports, 2, 1000.0, &b);
    /* - rho dQ/dt r: -1000 x 0.02 x (-0.7, 0), -1000 x -0.02 x (0, 0.9) */
    assert_close(b.unsteady.x, 14.0, 1e-14);
    assert_close(b.unsteady.y, 18.0, 1e-14);
    assert_close(b.thrust.x, 14.0, 1e-14);
    assert_close(b.thrust.z, -3000.0, 1e-14);
}

/* The force that brings the water in a straight leg to rest: rho L dQ/dt. */
static void water_slowing_in_a_straight_leg_drives_it_on(void **state)
{
    (void)state;
    kent_port ports[2] = {kent_build_port(WEST, 0.0, 0.0, 0.5),
                          kent_build_port(EAST, 0.0, 0.0, 0.5)};
    kent_balance b = {0};
    ports[0].face = ports[1].face = 3.0;
    b.port[0].flow_rate = 0.05; /* flow eastwards loses 0.05 m3/s every second */
    b.port[1].flow_rate = -0.05;
    kent_balance_sum(ports, 2, 1000.0, &b);
    assert_close(b.thrust.x, 1000.0 * 6.0 * 0.05, 1e-14);
}

/* beta: laminar 4/3 (Cengel & Cimbala Ex 6-1 p 248), turbulent 1 + 0.98 f (from
 * memory). */
static void the_momentum_factor_follows_the_profile(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_port port = kent_build_port(WEST, 0.0, 0.0, 0.5);
    port.momentum_factor = (double)NAN;
    (void)kent_build_ports(&b, "F", KENT_DEAD_END, &port, 1);
    kent_build_derive(&b);
    const double area = 0.25 * PI * 0.25;
    assert_close(kent_port_momentum_factor(b.model, &port, 0.0), 4.0 / 3.0, 1e-12);
    assert_close(kent_port_momentum_factor(b.model, &port, -2.0 * area),
                 1.0 + 0.98 * kent_colebrook(1e6, 0.0), 1e-12);
    port.momentum_factor = 1.03; /* given: wins */
    assert_true(kent_port_momentum_factor(b.model, &port, 1.0) == 1.03);
    kent_build_clear(&b);
}

static void the_first_of_the_widest_ports_is_the_reference(void **state)
{
    (void)state;
    const kent_port ports[3] = {kent_build_port(WEST, 0.0, 0.0, 0.3),
                                kent_build_port(EAST, 0.0, 0.0, 0.4),
                                kent_build_port(NORTH, 0.0, 0.0, 0.4)};
    assert_int_equal(kent_port_widest(ports, 3), 1);
}

static void flows_that_do_not_balance_are_measured(void **state)
{
    (void)state;
    const kent_port ports[2] = {kent_build_port(WEST, 0.0, -0.50, 0.3),
                                kent_build_port(EAST, 0.0, 0.45, 0.3)};
    assert_close(kent_balance_flow_gap(ports, 2), 0.1, 1e-12);
    assert_true(kent_balance_flow_gap(ports, 1) == 1.0);
    const kent_port still = kent_build_port(WEST, 0.0, 0.0, 0.3);
    assert_true(kent_balance_flow_gap(&still, 1) == 0.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_tee_is_pushed_away_from_its_branch),
        cmocka_unit_test(a_reducer_is_pushed_towards_its_small_end),
        cmocka_unit_test(suction_pulls_every_one_the_other_way),
        cmocka_unit_test(a_straight_fitting_at_rest_has_no_thrust),
        cmocka_unit_test(a_stream_pushes_the_same_whichever_way_it_flows),
        cmocka_unit_test(pressure_acts_on_the_seal_and_momentum_on_the_bore),
        cmocka_unit_test(weight_and_changing_flow_have_rows_of_their_own),
        cmocka_unit_test(water_slowing_in_a_straight_leg_drives_it_on),
        cmocka_unit_test(the_momentum_factor_follows_the_profile),
        cmocka_unit_test(the_first_of_the_widest_ports_is_the_reference),
        cmocka_unit_test(flows_that_do_not_balance_are_measured),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
