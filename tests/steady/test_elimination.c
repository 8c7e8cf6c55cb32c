#include "kent_build.h"
#include "kent_check.h"
#include "kent_elimination_internal.h"

#include <math.h>
#include <stdlib.h>

/* A square of pipes with a tail, a fixed level and
 * a valve that discharges. */
static kent_build square(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "A", 100.0, 0.0, 0.0);
    kent_build_point(&b, "B", 200.0, 50.0, 0.0);
    kent_build_point(&b, "C", 200.0, -50.0, 0.0);
    kent_build_point(&b, "D", 300.0, 0.0, 0.0);
    kent_build_point(&b, "V", 400.0, 0.0, 0.0);
    const char *routes[] = {"R A", "A B", "A C", "B D", "C D", "D V"};
    for (int i = 0; i < 6; i++) {
        const char name[] = {(char)('p' + i), '\0'};
        kent_build_pipe(&b, name, routes[i], 0.3, 1000.0);
    }
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_valve(&b, "V1", "V", 0.1, 0.0);
    kent_build_derive(&b);
    return b;
}

static void a_solution_put_back_gives_the_right_hand_side(void **state)
{
    (void)state;
    kent_build b = square();
    kent_equations *eq = NULL;
    kent_elimination *el = NULL;
    kent_error err = {0};
    double value[128], x[64], right[64];

    assert_int_equal(kent_equations_new(b.model, &eq, &err), KENT_OK);
    assert_true(eq->size <= 64 && eq->row[eq->size] <= 128);
    assert_int_equal(kent_elimination_new(eq, &el), KENT_OK);
    for (int trial = 0; trial < 50; trial++) {
        for (size_t i = 0; i < eq->size; i++) {
            x[i] = 0.01 + 0.1 * fabs(sin((double)(i + 1) * (trial + 1.3)));
            right[i] = cos((double)(i + 2) * (trial + 0.7));
        }
        kent_equations_derivatives(eq, x, value);
        for (size_t e = 0; e < eq->spans; e++) { /* slopes of any size */
            value[eq->row[eq->nodes + e] + 2] =
                -pow(10.0, 3.0 * cos(trial + 2.0 * (double)e));
        }
        assert_int_equal(kent_elimination_factor(el, value), KENT_OK);
        assert_int_equal(kent_elimination_solve(el, right, x), KENT_OK);
        for (size_t i = 0; i < eq->size; i++) {
            double sum = 0.0;
            double size = fabs(right[i]);
            for (int64_t k = eq->row[i]; k < eq->row[i + 1]; k++) {
                sum += value[k] * x[eq->column[k]];
                size += fabs(value[k] * x[eq->column[k]]);
            }
            assert_within(sum, right[i], 1e-11 * size);
        }
    }
    kent_elimination_free(el);
    kent_equations_free(eq);
    kent_build_clear(&b);
}

static void one_array_may_hold_both_sides(void **state)
{
    (void)state;
    kent_build b = square();
    kent_equations *eq = NULL;
    kent_elimination *el = NULL;
    kent_error err = {0};
    double value[128], x[64], both[64];

    assert_int_equal(kent_equations_new(b.model, &eq, &err), KENT_OK);
    assert_int_equal(kent_elimination_new(eq, &el), KENT_OK);
    for (size_t i = 0; i < eq->size; i++) {
        x[i] = 0.1;
        both[i] = 1.0 + (double)i;
    }
    kent_equations_derivatives(eq, x, value);
    assert_int_equal(kent_elimination_factor(el, value), KENT_OK);
    assert_int_equal(kent_elimination_solve(el, both, x), KENT_OK);
    assert_int_equal(kent_elimination_solve(el, both, both), KENT_OK);
    for (size_t i = 0; i < eq->size; i++) {
        assert_true(both[i] == x[i]);
    }
    kent_elimination_free(el);
    kent_equations_free(eq);
    kent_build_clear(&b);
}

static void a_singular_matrix_is_told(void **state)
{
    (void)state;
    kent_build b = square();
    kent_equations *eq = NULL;
    kent_elimination *el = NULL;
    kent_error err = {0};
    double value[128], x[64] = {0};

    assert_int_equal(kent_equations_new(b.model, &eq, &err), KENT_OK);
    assert_int_equal(kent_elimination_new(eq, &el), KENT_OK);
    kent_equations_derivatives(eq, x, value);
    const size_t level = (size_t)kent_build_node_of(&b, "R");
    value[eq->row[level]] =
        0.0; /* at rest an empty row: nothing holds the head there */
    assert_int_equal(kent_elimination_factor(el, value), KENT_E_SOLVE);
    kent_elimination_free(el);
    kent_equations_free(eq);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_solution_put_back_gives_the_right_hand_side),
        cmocka_unit_test(one_array_may_hold_both_sides),
        cmocka_unit_test(a_singular_matrix_is_told),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
