/* The equations: the steady state solves them, and their derivatives are theirs. */
#include "kent_dae_internal.h"
#include "nets.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

typedef struct net {
    kent_build b;
    kent_steady *steady;
    kent_dae *dae;
    double *y, *rate, *f; /* [size] */
} net;

static double *room(size_t count)
{
    double *p = calloc(count, sizeof *p);
    assert_non_null(p);
    return p;
}

static net net_new(void)
{
    const kent_mesh mesh = {90.0, 1, 1.0};
    kent_error err = {0};
    net n = {.b = nets_loop()};
    n.steady = nets_steady(&n.b);
    assert_int_equal(kent_dae_new(n.b.model, n.steady, 0, &mesh, &n.dae, &err),
                     KENT_OK);
    n.y = room(n.dae->size);
    n.rate = room(n.dae->size);
    n.f = room(n.dae->size);
    kent_dae_start(n.dae, n.steady, n.y);
    return n;
}

static void net_clear(net *n)
{
    free(n->y);
    free(n->rate);
    free(n->f);
    kent_dae_free(n->dae);
    kent_steady_free(n->steady);
    kent_build_clear(&n->b);
}

static void the_steady_state_solves_them(void **state)
{
    (void)state;
    net n = net_new();
    kent_dae_residual(n.dae, 0.0, n.y, n.rate, n.f);
    for (size_t i = 0; i < n.dae->size; i++) {
        assert_within(n.f[i], 0.0, 1e-8); /* m/s of a cell; m, m3/s elsewhere */
    }
    net_clear(&n);
}

/* Away from the steady state, so that limiters are at work: against differences of the
 * residual over a small step of every unknown. */
static void derivatives_are_those_of_the_residual(void **state)
{
    (void)state;
    net n = net_new();
    const size_t size = n.dae->size;
    const double c = 7.0; /* 1/s, on rates */
    double *value = room((size_t)n.dae->row[size]);
    double *column = room(size), *other = room(size);

    srand(3);
    for (size_t i = 0; i < size; i++) {
        const double most = i < n.dae->nodes + n.b.model->node_count ? 5.0 : 1e-3;
        n.y[i] += most * ((double)rand() / RAND_MAX - 0.5);
    }
    kent_dae_derivatives(n.dae, 0.2, n.y, c, value);
    for (size_t j = 0; j < size; j++) {
        const double y = n.y[j];
        const double h = j < n.dae->nodes + n.b.model->node_count ? 1e-6 : 1e-8;
        memset(column, 0, size * sizeof *column);
        for (size_t i = 0; i < size; i++) {
            for (int64_t k = n.dae->row[i]; k < n.dae->row[i + 1]; k++) {
                if ((size_t)n.dae->column[k] == j) column[i] = value[k];
            }
        }
        n.y[j] = y + h;
        n.rate[j] = c * h;
        kent_dae_residual(n.dae, 0.2, n.y, n.rate, n.f);
        n.y[j] = y - h;
        n.rate[j] = -c * h;
        kent_dae_residual(n.dae, 0.2, n.y, n.rate, other);
        n.y[j] = y;
        n.rate[j] = 0.0;
        for (size_t i = 0; i < size; i++) {
            const double difference = (n.f[i] - other[i]) / (2.0 * h);
            assert_within(column[i], difference, 1e-5 * (1.0 + fabs(difference)));
        }
    }
    free(value);
    free(column);
    free(other);
    net_clear(&n);
}

static void heads_between_cells_lie_on_straight_lines(void **state)
{
    (void)state;
    net n = net_new();
    for (size_t i = 0; i < n.b.model->span_count; i++) {
        const double length = n.b.model->spans[i].length;
        for (int k = 0; k <= 20; k++) {
            const double at = length * k / 20.0;
            assert_within(kent_dae_head(n.dae, n.y, (int)i, at),
                          kent_steady_head(n.b.model, n.steady, (int)i, at), 1e-9);
        }
    }
    net_clear(&n);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_steady_state_solves_them),
        cmocka_unit_test(derivatives_are_those_of_the_residual),
        cmocka_unit_test(heads_between_cells_lie_on_straight_lines),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
