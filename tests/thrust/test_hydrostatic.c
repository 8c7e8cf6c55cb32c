/* Published tables of thrust at rest, worked out through fittings with given ports. The
 * area is stated in every test: half the published tables rest on outside diameters,
 * the others on nominal bores. */
#include "kent_build.h"
#include "kent_check.h"
#include "kent_loads.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
static const double INCH = 0.0254;     /* m */
static const double PSI = 6894.757;    /* Pa */
static const double POUND = 4.448222;  /* N */
static const double DECANEWTON = 10.0; /* N */

/* N: the thrust of a bend (degrees; 0: a dead end) of one diameter (m) at rest. */
static double thrust_at_rest(double angle, double diameter, double pressure)
{
    const double turn = angle * PI / 180.0;
    const kent_port ports[2] = {
        kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, pressure, 0.0, diameter),
        kent_build_port((kent_vec3){cos(turn), sin(turn), 0.0}, pressure, 0.0,
                        diameter)};
    kent_build b = kent_build_new();
    const bool end = angle == 0.0;
    (void)kent_build_ports(&b, "F", end ? KENT_DEAD_END : KENT_BEND, ports,
                           end ? 1 : 2);
    kent_build_derive(&b);

    kent_steady nothing = {0}, *steadies = &nothing;
    kent_error err = {0};
    kent_recorder *r = NULL;
    kent_loads_result *loads = NULL;
    assert_int_equal(kent_recorder_new(b.model, &steadies, &r, &err), KENT_OK);
    assert_int_equal(kent_recorder_finish(r, NULL, &loads, &err), KENT_OK);
    assert_int_equal(loads->fittings[0].count, 1);
    const kent_instant *worst = &loads->fittings[0].cases[0].worst[KENT_RESULTANT];
    assert_true(worst->set);
    const double thrust = kent_vec3_length(worst->balance.thrust);
    kent_loads_free(loads);
    kent_recorder_free(r);
    kent_build_clear(&b);
    return thrust;
}

typedef struct row {
    double diameter, pressure, angle, published;
} row;

/* NFPA 24, thrust table; area on the outside diameter of AWWA C151 iron. The 5 1/8
 * degree columns, and 6 in at 22 1/2 and 11 1/4, are from memory and derived. */
static void small_iron_pipe_as_in_nfpa_24(void **state)
{
    (void)state;
    static const row ROWS[] = {
        {4.80, 100, 0, 1810},    {4.80, 100, 90, 2559},   {4.80, 100, 45, 1385},
        {4.80, 100, 22.5, 706},  {4.80, 100, 11.25, 355}, {4.80, 100, 5.125, 162},
        {6.90, 100, 0, 3739},    {6.90, 100, 90, 5288},   {6.90, 100, 45, 2862},
        {6.90, 100, 22.5, 1459}, {6.90, 100, 11.25, 733}, {6.90, 100, 5.125, 334},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const row *r = &ROWS[i];
        const double got = thrust_at_rest(r->angle, r->diameter * INCH, 100.0 * PSI);
        assert_within(got / POUND, r->published, 1.0);
    }
}

/* Moser & Folkman, Buried Pipe Design, Table 4.13 by Example 4.3, p 242: 10 in iron, OD
 * 11.10 in, 90 degrees, per 100 psi. Area on the outside diameter. */
static void a_ten_inch_bend_as_in_moser(void **state)
{
    (void)state;
    assert_close(thrust_at_rest(90.0, 11.10 * INCH, 100.0 * PSI) / POUND, 13680.0,
                 0.0005);
}

/* 90 degrees per 100 psi, area on the outside diameter of AWWA C151 iron. NFPA 24 and
 * makers' handbooks, from memory. */
static void large_iron_pipe_as_in_the_handbooks(void **state)
{
    (void)state;
    static const row ROWS[] = {
        {13.20, 100, 90, 19353},  {17.40, 100, 90, 33628},  {25.80, 100, 90, 73934},
        {38.30, 100, 90, 162931}, {50.80, 100, 90, 286637},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const row *r = &ROWS[i];
        const double got = thrust_at_rest(r->angle, r->diameter * INCH, 100.0 * PSI);
        assert_within(got / POUND, r->published, 1.0);
    }
}

/* A printed laying leaflet for EN 545 pipes, 2007: thrust per bar, area on the outside
 * diameter. */
static void en_545_pipe_as_in_a_laying_leaflet(void **state)
{
    (void)state;
    static const row ROWS[] = {
        {0.118, 1e5, 0, 109},    {0.170, 1e5, 0, 227},  {0.222, 1e5, 0, 387},
        {0.326, 1e5, 0, 835},    {0.429, 1e5, 0, 1445}, {0.326, 1e5, 45, 639},
        {0.326, 1e5, 22.5, 326},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const row *r = &ROWS[i];
        const double got = thrust_at_rest(r->angle, r->diameter, r->pressure);
        assert_within(got / DECANEWTON, r->published, 0.6);
    }
}

/* The worked line of the same leaflet: DN 150 (OD 170 mm), 45 degrees, 10 bar. */
static void the_worked_line_of_the_leaflet(void **state)
{
    (void)state;
    assert_close(thrust_at_rest(45.0, 0.170, 10e5) / DECANEWTON, 1740.0, 0.003);
}

/* City of Renton WA, drawing S-3415: area on the nominal bore. */
static void nominal_bores_as_in_a_city_drawing(void **state)
{
    (void)state;
    static const row ROWS[] = {
        {24, 200, 0, 90480},    {24, 200, 90, 127980}, {24, 200, 45, 69200},
        {16, 225, 0, 45250},    {16, 225, 90, 64000},  {16, 225, 45, 34620},
        {16, 225, 22.5, 17650}, {10, 275, 0, 21620},   {10, 275, 90, 30570},
        {10, 275, 45, 16540},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const row *r = &ROWS[i];
        const double got =
            thrust_at_rest(r->angle, r->diameter * INCH, r->pressure * PSI);
        assert_close(got / POUND, r->published, 0.001);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(small_iron_pipe_as_in_nfpa_24),
        cmocka_unit_test(a_ten_inch_bend_as_in_moser),
        cmocka_unit_test(large_iron_pipe_as_in_the_handbooks),
        cmocka_unit_test(en_545_pipe_as_in_a_laying_leaflet),
        cmocka_unit_test(the_worked_line_of_the_leaflet),
        cmocka_unit_test(nominal_bores_as_in_a_city_drawing),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
