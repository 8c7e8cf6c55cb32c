/* A uniform pressure all round moves no thrust: why gauge pressures serve.
 *
 * The control surface of a fitting is closed by its ports and its outer wall. With
 * absolute pressures inside, the surroundings press on the wall, and the wall's
 * integral is worked out here by numerical quadrature over its true shape, knowing
 * nothing of the ports. Port terms at p + p0 plus that integral must be the thrust at
 * gauge p. */
#include "kent_balance.h"
#include "kent_build.h"
#include "kent_check.h"
#include "kent_loads.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
static const double SURROUNDINGS = 101325.0; /* Pa */

static kent_vec3 thrust_of(const kent_port *ports, size_t count, double added)
{
    kent_balance b = {0};
    for (size_t i = 0; i < count; i++) {
        b.port[i].pressure = ports[i].pressure + added;
        b.port[i].flow = ports[i].flow;
        b.port[i].momentum_factor = 1.0;
    }
    kent_balance_sum(ports, count, 1000.0, &b);
    return b.thrust;
}

static void assert_same(kent_vec3 got, kent_vec3 want)
{
    const double gap = 1e-5 * (1.0 + kent_vec3_length(want));
    assert_within(got.x, want.x, gap);
    assert_within(got.y, want.y, gap);
    assert_within(got.z, want.z, gap);
}

/* Force of p0 on the outer wall of a torus segment: it enters at the origin along +x
 * and turns left about (0, R). Tube radius r. Midpoint rule in both angles. */
static kent_vec3 torus_wall(double R, double r, double turn)
{
    enum { ALONG = 2000, ROUND = 200 };
    kent_vec3 sum = {0.0, 0.0, 0.0};
    for (int i = 0; i < ALONG; i++) {
        const double s = turn * (i + 0.5) / ALONG;
        const kent_vec3 outwards = {sin(s), -cos(s), 0.0}; /* from the turning centre */
        for (int k = 0; k < ROUND; k++) {
            const double a = 2.0 * PI * (k + 0.5) / ROUND;
            const kent_vec3 n = {cos(a) * outwards.x, cos(a) * outwards.y, sin(a)};
            const double area =
                (R + r * cos(a)) * (turn / ALONG) * r * (2.0 * PI / ROUND);
            sum = kent_vec3_add(sum, kent_vec3_scale(-SURROUNDINGS * area, n));
        }
    }
    return sum;
}

static void a_bend_feels_nothing_of_its_surroundings(void **state)
{
    (void)state;
    for (int degrees = 15; degrees <= 180; degrees += 15) {
        const double turn = degrees * PI / 180.0;
        const kent_port ports[2] = {
            kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, 6e5, -0.4, 0.5),
            kent_build_port((kent_vec3){cos(turn), sin(turn), 0.0}, 6e5, 0.4, 0.5)};
        const kent_vec3 wall = torus_wall(0.9, 0.25, turn);
        const kent_vec3 absolute =
            kent_vec3_add(thrust_of(ports, 2, SURROUNDINGS), wall);
        assert_same(absolute, thrust_of(ports, 2, 0.0));
    }
}

/* Force of p0 on a cone's wall from radius r1 to r2 along +x. */
static kent_vec3 cone_wall(double r1, double r2, double length)
{
    enum { ALONG = 400, ROUND = 200 };
    const double slope = (r2 - r1) / length;
    kent_vec3 sum = {0.0, 0.0, 0.0};
    for (int i = 0; i < ALONG; i++) {
        const double r = r1 + (r2 - r1) * (i + 0.5) / ALONG;
        for (int k = 0; k < ROUND; k++) {
            const double a = 2.0 * PI * (k + 0.5) / ROUND;
            const double area = r * (2.0 * PI / ROUND) * (length / ALONG);
            const kent_vec3 n = {-slope, cos(a),
                                 sin(a)}; /* area is the projected one */
            sum = kent_vec3_add(sum, kent_vec3_scale(-SURROUNDINGS * area, n));
        }
    }
    return sum;
}

static void a_reducer_feels_nothing_of_its_surroundings(void **state)
{
    (void)state;
    const kent_port ports[2] = {
        kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, 6e5, -0.1, 0.5),
        kent_build_port((kent_vec3){1.0, 0.0, 0.0}, 5.5e5, 0.1, 0.3)};
    const kent_vec3 wall = cone_wall(0.25, 0.15, 0.8);
    assert_same(kent_vec3_add(thrust_of(ports, 2, SURROUNDINGS), wall),
                thrust_of(ports, 2, 0.0));
}

/* Through the program: the barometer may stand anywhere. */
static void the_barometer_moves_no_thrust(void **state)
{
    (void)state;
    kent_vec3 thrust[2];
    for (int k = 0; k < 2; k++) {
        kent_build b = kent_build_new();
        const kent_port ports[2] = {
            kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, 6e5, -0.4, 0.5),
            kent_build_port((kent_vec3){0.6, 0.8, 0.0}, 6e5, 0.4, 0.5)};
        (void)kent_build_ports(&b, "F", KENT_BEND, ports, 2);
        b.model->barometric = k == 0 ? 101325.0 : 60000.0;
        kent_build_derive(&b);
        kent_steady nothing = {0}, *steadies = &nothing;
        kent_error err = {0};
        kent_recorder *r = NULL;
        kent_loads_result *loads = NULL;
        assert_int_equal(kent_recorder_new(b.model, &steadies, &r, &err), KENT_OK);
        assert_int_equal(kent_recorder_finish(r, NULL, &loads, &err), KENT_OK);
        thrust[k] = loads->fittings[0].cases[0].worst[KENT_RESULTANT].balance.thrust;
        kent_loads_free(loads);
        kent_recorder_free(r);
        kent_build_clear(&b);
    }
    assert_true(thrust[0].x == thrust[1].x && thrust[0].y == thrust[1].y);
    assert_true(thrust[0].x > 0.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_bend_feels_nothing_of_its_surroundings),
        cmocka_unit_test(a_reducer_feels_nothing_of_its_surroundings),
        cmocka_unit_test(the_barometer_moves_no_thrust),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
