#include "kent_vec3.h"
#include "kent_check.h"

static void east_cross_north_is_up(void **state)
{
    (void)state;
    const kent_vec3 east = {1, 0, 0}, north = {0, 1, 0};
    const kent_vec3 up = kent_vec3_cross(east, north);
    assert_true(up.x == 0.0 && up.y == 0.0 && up.z == 1.0);
}

static void angles_are_right_where_arc_cosine_is_not(void **state)
{
    (void)state;
    const double pi = acos(-1.0);
    for (int power = -9; power < 0; power++) {
        const double angle = pow(10.0, power);
        const kent_vec3 a = {2.0, 0.0, 0.0};
        const kent_vec3 b = {3.0 * cos(angle), 3.0 * sin(angle), 0.0};
        assert_close(kent_vec3_angle(a, b), angle, 1e-12);
        assert_within(kent_vec3_angle(a, kent_vec3_scale(-1.0, b)), pi - angle, 1e-15);
    }
}

static void a_unit_vector_has_length_one_and_nothing_stays_nothing(void **state)
{
    (void)state;
    const kent_vec3 a = {3.0, -4.0, 12.0};
    assert_close(kent_vec3_length(a), 13.0, 1e-15);
    assert_close(kent_vec3_length(kent_vec3_unit(a)), 1.0, 1e-15);
    assert_close(kent_vec3_dot(kent_vec3_unit(a), a), 13.0, 1e-15);
    assert_true(kent_vec3_length(kent_vec3_unit((kent_vec3){0, 0, 0})) == 0.0);
}

static void sum_and_difference_undo_each_other(void **state)
{
    (void)state;
    const kent_vec3 a = {1.5, -2.0, 0.25}, b = {-8.0, 4.0, 2.0};
    const kent_vec3 back = kent_vec3_sub(kent_vec3_add(a, b), b);
    assert_true(back.x == a.x && back.y == a.y && back.z == a.z);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(east_cross_north_is_up),
        cmocka_unit_test(angles_are_right_where_arc_cosine_is_not),
        cmocka_unit_test(a_unit_vector_has_length_one_and_nothing_stays_nothing),
        cmocka_unit_test(sum_and_difference_undo_each_other),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
