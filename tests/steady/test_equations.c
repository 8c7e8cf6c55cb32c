#include "kent_build.h"
#include "kent_check.h"
#include "kent_equations_internal.h"

#include <math.h>
#include <stdlib.h>

/* Every kind of equation in one network: two fixed levels, a loop, a valve in line and
 * one that discharges, an outflow of each kind. */
static kent_build every_kind(void)
{
    kent_build b = kent_build_new();
    const char *ids[] = {"R", "A", "B", "C", "D", "E", "S"};
    const char *routes[] = {"R A", "A B", "A C", "B D", "C D", "D E", "S D"};
    for (int i = 0; i < 7; i++) {
        kent_build_point(&b, ids[i], 100.0 * i, 40.0 * (i % 3), 2.0 * i);
    }
    for (int i = 0; i < 7; i++) {
        const char name[] = {(char)('p' + i), '\0'};
        const int p = kent_build_pipe(&b, name, routes[i], 0.2 + 0.05 * i, 1000.0);
        b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
        b.model->pipes[p].friction_coefficient = 1e-4;
        b.model->pipes[p].loss = 0.3 * i;
    }
    b.model->pipes[2].friction = KENT_HAZEN_WILLIAMS;
    b.model->pipes[2].friction_coefficient = 120.0;
    b.model->pipes[3].friction = KENT_MANNING;
    b.model->pipes[3].friction_coefficient = 0.011;
    const int level = kent_build_fixed_level(&b, "R", 90.0);
    b.model->fixed_levels[level].loss = 0.5;
    kent_build_fixed_level(&b, "S", 95.0);
    kent_build_valve(&b, "V1", "C", 0.3, (double)NAN);
    kent_build_valve(&b, "V2", "E", 0.05, 20.0);
    kent_build_outflow(&b, "A", 0.02);
    const int o = kent_build_outflow(&b, "B", 0.03);
    b.model->outflows[o].pressure_dependent = true;
    b.model->outflows[o].full_pressure = 2e5;
    kent_build_derive(&b);
    return b;
}

/* x somewhere that no equation is at rest. */
static void scatter(const kent_equations *eq, double *x)
{
    for (size_t i = 0; i < eq->size; i++) {
        const double wave = sin(1.7 * (double)i + 0.4);
        x[i] = i < eq->nodes ? 80.0 + 10.0 * wave : 0.12 * wave;
    }
}

static void derivatives_agree_with_central_differences(void **state)
{
    (void)state;
    kent_build b = every_kind();
    kent_equations *eq = NULL;
    kent_error err = {0};
    assert_int_equal(kent_equations_new(b.model, &eq, &err), KENT_OK);
    const size_t n = eq->size;
    double *x = kent_alloc(n, sizeof *x);
    double *plus = kent_alloc(n, sizeof *plus);
    double *minus = kent_alloc(n, sizeof *minus);
    double *dense = kent_alloc(n * n, sizeof *dense);
    double *value = kent_alloc((size_t)eq->row[n], sizeof *value);
    assert_true(x && plus && minus && dense && value);

    scatter(eq, x);
    kent_equations_derivatives(eq, x, value);
    for (size_t i = 0; i < n; i++) {
        for (int64_t k = eq->row[i]; k < eq->row[i + 1]; k++) {
            dense[i * n + (size_t)eq->column[k]] += value[k];
        }
    }
    for (size_t j = 0; j < n; j++) {
        const double at = x[j];
        const double step = j < eq->nodes ? 1e-4 : 1e-6;
        x[j] = at + step;
        kent_equations_residual(eq, x, plus);
        x[j] = at - step;
        kent_equations_residual(eq, x, minus);
        x[j] = at;
        for (size_t i = 0; i < n; i++) {
            const double want = (plus[i] - minus[i]) / (2.0 * step);
            assert_within(dense[i * n + j], want, 1e-6 + 1e-5 * fabs(want));
        }
    }
    free(x);
    free(plus);
    free(minus);
    free(dense);
    free(value);
    kent_equations_free(eq);
    kent_build_clear(&b);
}

static void every_slope_is_positive_at_rest(void **state)
{
    (void)state;
    kent_build b = every_kind();
    b.model->spans[0].friction.law = KENT_FRICTIONLESS;
    b.model->spans[0].loss = 0.0;
    kent_equations *eq = NULL;
    kent_error err = {0};
    assert_int_equal(kent_equations_new(b.model, &eq, &err), KENT_OK);
    double *x = kent_alloc(eq->size, sizeof *x);
    double *value = kent_alloc((size_t)eq->row[eq->size], sizeof *value);
    assert_true(x && value);
    kent_equations_derivatives(eq, x, value);
    for (size_t e = 0; e < eq->spans; e++) {
        assert_true(value[eq->row[eq->nodes + e] + 2] < 0.0);
    }
    free(x);
    free(value);
    kent_equations_free(eq);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(derivatives_agree_with_central_differences),
        cmocka_unit_test(every_slope_is_positive_at_rest),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
