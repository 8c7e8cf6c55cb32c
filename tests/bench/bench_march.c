/* Races the engine against the textbook program, time loops alone, in one run. */
#include "kent_check.h"
#include "kent_marcher.h"
#include "network.h"
#include "textbook.h"

#include <stdio.h>
#include <stdlib.h>
#include <time.h>

enum { RUNS = 9, STEPS = 2000, BLOCK = 250 };

static double seconds(void)
{
    struct timespec t;
    (void)clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

static int by_size(const void *a, const void *b)
{
    const double x = *(const double *)a, y = *(const double *)b;
    return (x > y) - (x < y);
}

static double time_engine(const kent_model *m, const kent_steady *s, const kent_grid *g,
                          const char **kernel)
{
    const kent_watch watch = {0, 0.0};
    kent_marcher *k = NULL;
    kent_trace trace;
    kent_error err = {0};
    if (kent_marcher_new(m, s, g, 0, &watch, 1, BLOCK, &k, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    *kernel = kent_marcher_kernel(k);
    (void)kent_marcher_advance(k, 1, &trace, &err);
    const double start = seconds();
    for (int done = 0; done < STEPS; done += BLOCK) {
        if (kent_marcher_advance(k, BLOCK, &trace, &err) != BLOCK) {
            fail_msg("%s", err.what);
        }
    }
    const double took = seconds() - start;
    kent_marcher_free(k);
    return took;
}

static double time_textbook(const kent_model *m, const kent_steady *s,
                            const kent_grid *g)
{
    textbook *t = textbook_new(m, s, g, 0, false);
    assert_non_null(t);
    const double start = seconds();
    textbook_run(t, STEPS);
    const double took = seconds() - start;
    textbook_free(t);
    return took;
}

static void report(const char *what, double *took, size_t nodes)
{
    const double scale = 1e9 / ((double)nodes * STEPS);
    qsort(took, RUNS, sizeof *took, by_size);
    (void)printf("%-28s median %7.3f  least %7.3f  ns per node and step\n", what,
                 took[RUNS / 2] * scale, took[0] * scale);
}

static void race(void **state)
{
    (void)state;
    kent_build b = network_build();
    kent_steady *s = NULL;
    kent_grid *g = NULL;
    kent_error err = {0};
    const char *kernel = "";
    double engine[RUNS], plain[RUNS], ratio[RUNS];

    if (kent_steady_solve(b.model, &s, &err) != KENT_OK ||
        kent_grid_plan(b.model, 20.0, &g, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    for (int i = 0; i < RUNS;
         i++) { /* turn about, so that both meet the same weather */
        engine[i] = time_engine(b.model, s, g, &kernel);
        plain[i] = time_textbook(b.model, s, g);
        ratio[i] = plain[i] / engine[i];
    }
    (void)printf("%zu spans, %zu nodes, %zu where spans meet; %d steps, envelopes on; "
                 "kernel %s; %d runs each\n",
                 b.model->span_count, g->node_total, b.model->node_count, STEPS, kernel,
                 RUNS);
    report("engine", engine, g->node_total);
    report("textbook program, -O2", plain, g->node_total);
    qsort(ratio, RUNS, sizeof *ratio, by_size);
    (void)printf("%-28s median %7.2f  least %7.2f  (must be at least 5)\n",
                 "textbook over engine", ratio[RUNS / 2], ratio[0]);
    assert_true(ratio[RUNS / 2] >= 5.0);
    kent_grid_free(g);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* Every pipe creeps by five elements. */
static void make_plastic(kent_model *m)
{
    static const double time[] = {0.05, 0.5, 1.5, 5.0, 10.0}; /* s */
    m->creep = kent_alloc(5, sizeof *m->creep);
    assert_non_null(m->creep);
    for (int i = 0; i < 5; i++) {
        m->creep[m->creep_count++] = (kent_creep){time[i], 1e-11};
    }
    for (size_t i = 0; i < m->pipe_count; i++) {
        m->pipes[i].creep_count = m->creep_count;
    }
}

/* What memory costs: the same march with friction and walls that remember. */
static void remember(void **state)
{
    (void)state;
    static const struct {
        const char *what;
        kent_surge_friction friction;
        bool creep;
    } kinds[] = {{"engine, quasi-steady", KENT_SURGE_QUASI_STEADY, false},
                 {"  unsteady", KENT_SURGE_UNSTEADY, false},
                 {"  quasi-steady, creep", KENT_SURGE_QUASI_STEADY, true},
                 {"  unsteady, creep", KENT_SURGE_UNSTEADY, true}};
    enum { KINDS = sizeof kinds / sizeof kinds[0] };
    kent_build b = network_build();
    kent_steady *s = NULL;
    kent_grid *g = NULL;
    kent_error err = {0};
    const char *kernel = "";
    double took[KINDS][RUNS], ratio[KINDS][RUNS];

    make_plastic(b.model);
    if (kent_steady_solve(b.model, &s, &err) != KENT_OK ||
        kent_grid_plan(b.model, 20.0, &g, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    for (int i = 0; i < RUNS; i++) {
        for (int kind = 0; kind < KINDS; kind++) {
            b.model->solver.friction = kinds[kind].friction;
            b.model->solver.creep = kinds[kind].creep;
            took[kind][i] = time_engine(b.model, s, g, &kernel);
            ratio[kind][i] = took[kind][i] / took[0][i];
        }
    }
    for (int kind = 0; kind < KINDS; kind++) {
        report(kinds[kind].what, took[kind], g->node_total);
        qsort(ratio[kind], RUNS, sizeof ratio[kind][0], by_size);
        if (kind == 0) continue;
        (void)printf("%-28s median %7.2f  least %7.2f\n", "    over quasi-steady",
                     ratio[kind][RUNS / 2], ratio[kind][0]);
    }
    kent_grid_free(g);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* What cavities cost: while all sleep, and where the vapour limit is raised towards the
 * heads of the network, so that some blocks are awake, or past all heads and levels, so
 * that there is a cavity at every grid point. */
static void part(void **state)
{
    (void)state;
    static const struct {
        const char *what;
        kent_surge_friction friction;
        kent_separation separation;
        double vapour; /* Pa over barometric */
        int base;      /* row it is held against */
    } kinds[] = {
        {"engine, constant friction", KENT_SURGE_CONSTANT, KENT_SEPARATION_NONE, -1e5,
         0},
        {"  cavities asleep", KENT_SURGE_CONSTANT, KENT_SEPARATION_GAS, -1e5, 0},
        {"  all open", KENT_SURGE_CONSTANT, KENT_SEPARATION_GAS, 2.2e6, 0},
        {"engine, quasi-steady", KENT_SURGE_QUASI_STEADY, KENT_SEPARATION_NONE, -1e5,
         3},
        {"  cavities asleep", KENT_SURGE_QUASI_STEADY, KENT_SEPARATION_GAS, -1e5, 3},
        {"  some awake", KENT_SURGE_QUASI_STEADY, KENT_SEPARATION_GAS, 1.5e6, 3},
        {"  all open", KENT_SURGE_QUASI_STEADY, KENT_SEPARATION_GAS, 2.2e6, 3},
        {"  all open, vapour", KENT_SURGE_QUASI_STEADY, KENT_SEPARATION_VAPOUR, 2.2e6,
         3},
        {"engine, unsteady", KENT_SURGE_UNSTEADY, KENT_SEPARATION_NONE, -1e5, 8},
        {"  cavities asleep", KENT_SURGE_UNSTEADY, KENT_SEPARATION_GAS, -1e5, 8}};
    enum { KINDS = sizeof kinds / sizeof kinds[0] };
    kent_build b = network_build();
    kent_steady *s = NULL;
    kent_grid *g = NULL;
    kent_error err = {0};
    const char *kernel = "";
    double took[KINDS][RUNS], ratio[KINDS][RUNS];

    if (kent_steady_solve(b.model, &s, &err) != KENT_OK ||
        kent_grid_plan(b.model, 20.0, &g, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    for (int i = 0; i < RUNS; i++) {
        for (int kind = 0; kind < KINDS; kind++) {
            b.model->solver.friction = kinds[kind].friction;
            b.model->solver.column_separation = kinds[kind].separation;
            b.model->water.vapour_pressure = b.model->barometric + kinds[kind].vapour;
            took[kind][i] = time_engine(b.model, s, g, &kernel);
            ratio[kind][i] = took[kind][i] / took[kinds[kind].base][i];
        }
    }
    for (int kind = 0; kind < KINDS; kind++) {
        report(kinds[kind].what, took[kind], g->node_total);
        qsort(ratio[kind], RUNS, sizeof ratio[kind][0], by_size);
        if (kind == kinds[kind].base) continue;
        const bool asleep = kinds[kind].vapour < 0.0;
        (void)printf("%-28s median %7.2f  least %7.2f%s\n", "    over none",
                     ratio[kind][RUNS / 2], ratio[kind][0],
                     asleep ? "  (aim: at most 1.10)" : "");
    }
    kent_grid_free(g);
    kent_steady_free(s);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(race), cmocka_unit_test(part),
                                       cmocka_unit_test(remember)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
