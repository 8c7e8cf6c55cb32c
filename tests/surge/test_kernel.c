#include "kent_kernel_internal.h"

#include "kent_check.h"

#include <float.h>
#include <math.h>
#include <stdbool.h>
#include <string.h>

enum { N = 3 * KENT_BLOCK + 11 }; /* no multiple of any vector */

typedef struct nodes {
    double k[N], p[N], m[N], highest[N], lowest[N];
} nodes;

/* Heads and flows of every size, some at rest, some against the others. */
static nodes some_nodes(void)
{
    nodes n;
    for (int i = 0; i < N; i++) {
        const double head = 50.0 + 40.0 * sin(0.7 * i), swing = 30.0 * cos(1.3 * i * i);
        n.k[i] = 1e-4 * (1 + i % 17);
        n.p[i] = head + (i % 11 == 0 ? 0.0 : swing);
        n.m[i] = head - (i % 11 == 0 ? 0.0 : swing);
        n.highest[i] = 100.0;
        n.lowest[i] = 90.0 + i % 7;
    }
    return n;
}

static const kent_kernel *pick(const char *name)
{
    const kent_kernel *kernel = NULL;
    kent_error err = {0};
    if (kent_kernel_pick(name, &kernel, &err) == KENT_OK) return kernel;
    assert_int_equal(err.status, KENT_E_INPUT);
    print_message("not compared: %s\n", err.what);
    return NULL;
}

static void a_node_loses_r_q_q_to_either_side(void **state)
{
    (void)state;
    const double head = 80.0, flow = -0.2, b = 300.0,
                 r = 12.0; /* m, m3/s, s/m2, s2/m5 */
    double k = r / (4.0 * b * b), p = head + b * flow, m = head - b * flow;
    double highest = 0.0, lowest = 1e9;
    const kent_kernel *kernel = pick("base");
    assert_int_equal(kernel->explicit_sweep(1, 0.25, &k, &p, &m, &highest, &lowest), 0);
    assert_close(p, head + b * flow - r * flow * fabs(flow), 1e-14);
    assert_close(m, head - b * flow + r * flow * fabs(flow), 1e-14);
    assert_close(0.5 * highest, head, 1e-15);
    assert_close(0.5 * lowest, head, 1e-15);
}

static void every_kernel_gives_the_same_bits(void **state)
{
    (void)state;
    static const char *const level[] = {"avx2", "avx512"};
    for (int implicit = 0; implicit < 2; implicit++) {
        nodes want = some_nodes();
        const kent_kernel *base = pick("base");
        kent_sweep *sweep = implicit ? base->implicit_sweep : base->explicit_sweep;
        const int64_t beyond =
            sweep(N, 0.02, want.k, want.p, want.m, want.highest, want.lowest);
        assert_in_range(beyond, 1, N - 1); /* some of either kind */
        for (int i = 0; i < 2; i++) {
            const kent_kernel *kernel = pick(level[i]);
            nodes got = some_nodes();
            if (!kernel) continue;
            sweep = implicit ? kernel->implicit_sweep : kernel->explicit_sweep;
            assert_true(beyond ==
                        sweep(N, 0.02, got.k, got.p, got.m, got.highest, got.lowest));
            assert_memory_equal(&got, &want, sizeof got);
        }
    }
}

/* A watching sweep leaves the same numbers, and marks just the blocks that a p or an m
 * below the floor comes from or goes to, and those that would stop the march. */
static void a_watching_sweep_marks_what_may_be_low(void **state)
{
    (void)state;
    enum { BLOCKS = (N + KENT_BLOCK - 1) / KENT_BLOCK };
    static const char *const level[] = {"base", "avx2", "avx512"};
    for (int i = 0; i < 12; i++) {
        const bool implicit = i % 2 == 1;
        const double limit = i < 6 ? 1e9 : 0.02; /* none and some beyond it */
        const kent_kernel *kernel = pick(level[i / 2 % 3]);
        if (!kernel) continue;
        nodes want = some_nodes(), got = some_nodes();
        double p[N + 2] = {1e9}, m[N + 2] = {0.0}; /* room for the neighbours */
        uint8_t low[BLOCKS] = {0}, mark[BLOCKS] = {0};
        kent_floor floors[BLOCKS];
        const int64_t beyond =
            (implicit ? kernel->implicit_sweep : kernel->explicit_sweep)(
                N, limit, want.k, want.p, want.m, want.highest, want.lowest);
        memcpy(p + 1, got.p, sizeof got.p);
        memcpy(m, got.m, sizeof got.m);
        m[N] = 1e9;
        for (int b = 0; b < BLOCKS; b++) {
            floors[b] = (kent_floor){-1e9, -1e9};
        }
        floors[1].p = want.p[KENT_BLOCK + 6] + 1e-9; /* one inside */
        floors[2].p =
            want.p[(size_t)2 * KENT_BLOCK - 1]; /* one over its edge, not below */
        floors[2].m = want.m[(size_t)3 * KENT_BLOCK] + 1e-9;
        for (int b = 0; b < BLOCKS; b++) {
            for (int n = KENT_BLOCK * b - 1; n <= KENT_BLOCK * (b + 1); n++) {
                const bool inside = n >= KENT_BLOCK * b && n < KENT_BLOCK * (b + 1);
                if (n < 0 || n >= N) continue;
                const bool over =
                    inside && want.k[n] * fabs(want.p[n] - want.m[n]) > limit;
                const bool low_p =
                    (inside || n < KENT_BLOCK * b) && want.p[n] < floors[b].p;
                const bool low_m =
                    (inside || n > KENT_BLOCK * b) && want.m[n] < floors[b].m;
                if (over || low_p || low_m) mark[b] = 1;
            }
        }
        assert_true(
            beyond ==
            (implicit ? kernel->implicit_watch : kernel->explicit_watch)(
                N, limit, got.k, p + 1, m, got.highest, got.lowest, floors, low));
        assert_memory_equal(low, mark, sizeof low);
        assert_true(low[1] == 1 && low[2] == 1 && low[0] == (i < 6 ? 0 : 1));
        assert_memory_equal(p + 1, want.p, sizeof want.p);
        assert_memory_equal(m, want.m, sizeof want.m);
        assert_memory_equal(got.highest, want.highest, sizeof want.highest);
        assert_memory_equal(got.lowest, want.lowest, sizeof want.lowest);
    }
}

static void nodes_beyond_the_limit_are_counted_and_left(void **state)
{
    (void)state;
    const kent_kernel *kernel = pick(NULL);
    double k[3] = {0.01, 0.01, 0.01}, p[3] = {20.0, 13.0, (double)NAN};
    double m[3] = {-20.0, -13.0, 1.0}, high[3] = {0.0}, low[3] = {0.0};
    /* k|d| = 0.4 and 0.26 beyond 0.25; NaN beyond any */
    assert_int_equal(kernel->explicit_sweep(3, 0.25, k, p, m, high, low), 3);
    assert_true(p[0] == 20.0 && m[0] == -20.0 && p[1] == 13.0 && m[1] == -13.0);
    p[2] = 2.0;
    assert_int_equal(kernel->explicit_sweep(3, 0.3, k, p, m, high, low), 1);
    assert_true(p[0] == 20.0 && p[1] < 13.0 && p[2] < 2.0);
    p[2] = (double)NAN;
    assert_int_equal(kernel->implicit_sweep(3, DBL_MAX, k, p, m, high, low), 1);
}

static void implicit_friction_never_turns_a_flow_round(void **state)
{
    (void)state;
    const kent_kernel *kernel = pick(NULL);
    for (int i = -6; i < 6; i++) {
        double k = pow(10.0, i); /* 1/m */
        double p = 30.0, m = -10.0, high = 0.0, low = 0.0;
        assert_int_equal(kernel->implicit_sweep(1, DBL_MAX, &k, &p, &m, &high, &low),
                         0);
        assert_true(p - m >= 0.0 && p - m < 40.0);
    }
}

static void unknown_kernels_are_refused(void **state)
{
    (void)state;
    const kent_kernel *kernel = NULL;
    kent_error err = {0};
    assert_int_equal(kent_kernel_pick("sse9", &kernel, &err), KENT_E_INPUT);
    assert_string_equal(err.what, "'sse9' is no kernel; base, avx2 or avx512");
    assert_null(kernel);
    assert_string_equal(pick("base")->name, "base");
    assert_non_null(pick(""));
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_node_loses_r_q_q_to_either_side),
        cmocka_unit_test(every_kernel_gives_the_same_bits),
        cmocka_unit_test(a_watching_sweep_marks_what_may_be_low),
        cmocka_unit_test(nodes_beyond_the_limit_are_counted_and_left),
        cmocka_unit_test(implicit_friction_never_turns_a_flow_round),
        cmocka_unit_test(unknown_kernels_are_refused),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
