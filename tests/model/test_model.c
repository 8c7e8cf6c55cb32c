/* kent_model.h: life, look-up, words, validity. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>

static void freeing_nothing_is_safe(void **state)
{
    (void)state;
    kent_model_free(NULL);
    kent_model *m = kent_model_new();
    assert_non_null(m);
    kent_model_free(m);
}

static void a_new_model_has_the_documented_defaults(void **state)
{
    (void)state;
    kent_model *m = kent_model_new();
    assert_non_null(m);
    assert_within(m->water.temperature, 288.15, 0.0);
    assert_close(m->gravity, 9.80665, 1e-15);
    assert_int_equal(m->ground.soil, -1);
    assert_true(isinf(m->ground.water_table));
    assert_true(isnan(m->loads.test_pressure));
    assert_int_equal(m->loads.test_gauge, -1);
    assert_true(m->solver.grid_check);
    assert_int_equal(m->solver.friction, KENT_SURGE_QUASI_STEADY);
    kent_model_free(m);
}

static void ids_find_their_things(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "E", 100.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_valve(&b, "V", "E", 0.3, 0.0);
    assert_int_equal(kent_model_point_index(b.model, "E"), 1);
    assert_int_equal(kent_model_pipe_index(b.model, "A"), 0);
    assert_int_equal(kent_model_valve_index(b.model, "V"), 0);
    assert_int_equal(kent_model_point_index(b.model, "nowhere"), -1);
    assert_int_equal(kent_model_pipe_index(b.model, "E"), -1);
    kent_build_clear(&b);
}

static void pressure_is_density_gravity_and_height(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    assert_close(kent_model_pressure(b.model, 60.0, 10.0), 1000.0 * 9.80665 * 50.0,
                 1e-15);
    assert_true(kent_model_pressure(b.model, 5.0, 10.0) < 0.0);
    kent_build_clear(&b);
}

static void words_are_those_of_the_case_file(void **state)
{
    (void)state;
    assert_string_equal(kent_fitting_type_word(KENT_DEAD_END), "dead-end");
    assert_string_equal(kent_orientation_word(KENT_COMBINED), "combined");
    assert_string_equal(kent_joint_word(KENT_PUSH_ON), "push-on");
    assert_string_equal(kent_class_word(KENT_OCCASIONAL), "occasional");
    assert_string_equal(kent_restraint_word(KENT_NO_RESTRAINT), "none");
    assert_string_equal(kent_axial_support_word(KENT_FLEXIBLE_JOINTS),
                        "flexible-joints");
    assert_string_equal(kent_friction_word(KENT_HAZEN_WILLIAMS), "Hazen-Williams");
}

static void only_push_on_and_mechanical_joints_slip(void **state)
{
    (void)state;
    assert_true(kent_joint_slips(KENT_PUSH_ON));
    assert_true(kent_joint_slips(KENT_MECHANICAL));
    assert_false(kent_joint_slips(KENT_FLANGED));
    assert_false(kent_joint_slips(KENT_WELDED));
    assert_false(kent_joint_slips(KENT_FUSED));
    assert_false(kent_joint_slips(KENT_RESTRAINED));
}

static void validity_sees_what_was_broken(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "E", 100.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R E", 0.5, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_derive(&b);
    kent_model *m = b.model;

    const kent_span span = m->spans[0];
    m->spans[0].length = -1.0;
    assert_false(kent_model_is_valid(m));
    m->spans[0] = span;
    m->spans[0].node[1] = 7;
    assert_false(kent_model_is_valid(m));
    m->spans[0] = span;
    m->ends[0].side = 1;
    assert_false(kent_model_is_valid(m));
    m->ends[0].side = 0;
    m->ports[0].direction = (kent_vec3){2.0, 0.0, 0.0};
    assert_false(kent_model_is_valid(m));
    m->ports[0].direction = (kent_vec3){-1.0, 0.0, 0.0};
    m->water.density = (double)NAN;
    assert_false(kent_model_is_valid(m));
    m->water.density = 1000.0;
    assert_true(kent_model_is_valid(m));
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(freeing_nothing_is_safe),
        cmocka_unit_test(a_new_model_has_the_documented_defaults),
        cmocka_unit_test(ids_find_their_things),
        cmocka_unit_test(pressure_is_density_gravity_and_height),
        cmocka_unit_test(words_are_those_of_the_case_file),
        cmocka_unit_test(only_push_on_and_mechanical_joints_slip),
        cmocka_unit_test(validity_sees_what_was_broken),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
