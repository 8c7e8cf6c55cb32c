/* Fittings that state their own ports and need no network. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>

static const double DEGREE = 3.14159265358979323846 / 180.0;

static kent_vec3 plan(double degrees)
{
    return (kent_vec3){cos(degrees * DEGREE), sin(degrees * DEGREE), 0.0};
}

static void a_sheet_needs_no_pipes(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    const kent_port ports[] = {
        kent_build_port((kent_vec3){-3.0, 0.0, 0.0}, 140e3, -0.425, 0.6),
        kent_build_port((kent_vec3){0.7071, 0.7071, 0.0}, 123e3, 0.425, 0.3),
    };
    kent_build_ports(&b, "B7", KENT_BEND, ports, 2);
    kent_build_derive(&b);
    const kent_model *m = b.model;
    assert_int_equal(m->span_count, 0);
    assert_int_equal(m->fitting_count, 1);
    assert_string_equal(m->fittings[0].id, "B7");
    assert_int_equal(m->fittings[0].point, -1);
    assert_close(m->fittings[0].angle, 45.0 * DEGREE, 1e-13);
    assert_close(m->fittings[0].size, 0.6, 1e-15);
    assert_close(kent_vec3_length(m->ports[0].direction), 1.0, 1e-15);
    assert_close(kent_vec3_length(m->ports[1].direction), 1.0, 1e-15);
    assert_int_equal(m->ports[0].span, -1);
    assert_close(m->ports[1].pressure, 123e3, 1e-15);
    kent_build_clear(&b);
}

static void the_type_follows_from_number_turn_and_size(void **state)
{
    (void)state;
    static const struct {
        size_t count;
        double degrees[4]; /* of each port in plan */
        double bore[4];    /* m */
        kent_fitting_type want;
    } rows[] = {
        {1, {180.0}, {0.3}, KENT_DEAD_END},
        {2, {180.0, 0.0}, {0.3, 0.3}, KENT_STRAIGHT},
        {2, {180.0, 0.0}, {0.3, 0.2}, KENT_REDUCER},
        {2, {180.0, 30.0}, {0.3, 0.3}, KENT_BEND},
        {2, {180.0, 30.0}, {0.3, 0.2}, KENT_BEND},
        {3, {180.0, 0.0, 90.0}, {0.3, 0.3, 0.1}, KENT_TEE},
        {3, {180.0, 0.0, 45.0}, {0.3, 0.3, 0.1}, KENT_WYE},
        {4, {180.0, 0.0, 90.0, 270.0}, {0.3, 0.3, 0.1, 0.1}, KENT_CROSS},
    };
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        kent_build b = kent_build_new();
        kent_port ports[4];
        for (size_t k = 0; k < rows[i].count; k++) {
            ports[k] =
                kent_build_port(plan(rows[i].degrees[k]), 1e5, 0.0, rows[i].bore[k]);
        }
        kent_build_ports(&b, "F", -1, ports, rows[i].count);
        kent_build_derive(&b);
        assert_int_equal(b.model->fittings[0].type, rows[i].want);
        kent_build_clear(&b);
    }
}

static void the_run_comes_first_whatever_the_order_given(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    const kent_port ports[] = {
        kent_build_port(plan(90.0), 1e5, 0.0, 0.1),
        kent_build_port(plan(180.0), 1e5, 0.0, 0.3),
        kent_build_port(plan(0.0), 1e5, 0.0, 0.3),
    };
    kent_build_ports(&b, "T", -1, ports, 3);
    kent_build_derive(&b);
    assert_close(b.model->ports[0].direction.x, -1.0, 1e-14);
    assert_close(b.model->ports[1].direction.x, 1.0, 1e-14);
    assert_close(b.model->ports[2].direction.y, 1.0, 1e-14);
    assert_close(b.model->fittings[0].branch_size, 0.1, 1e-15);
    kent_build_clear(&b);
}

static void the_seal_is_outside_diameter_where_given_else_the_bore(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_port ports[2] = {
        kent_build_port(plan(180.0), 1e5, 0.0, 0.3),
        kent_build_port(plan(0.0), 1e5, 0.0, 0.3),
    };
    ports[0].seal_diameter = ports[1].seal_diameter = (double)NAN;
    ports[1].outside_diameter = 0.326;
    kent_build_ports(&b, "F", -1, ports, 2);
    kent_build_derive(&b);
    assert_close(b.model->ports[0].seal_diameter, 0.3, 1e-15);
    assert_close(b.model->ports[1].seal_diameter, 0.326, 1e-15);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_sheet_needs_no_pipes),
        cmocka_unit_test(the_type_follows_from_number_turn_and_size),
        cmocka_unit_test(the_run_comes_first_whatever_the_order_given),
        cmocka_unit_test(the_seal_is_outside_diameter_where_given_else_the_bore),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
