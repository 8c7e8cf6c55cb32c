/* What a main keeps: without friction its energy and the way back, looked at in the
 * waves themselves so that the flow can be turned round; and its answers when a joint
 * is put in. */
#include "kent_ends_internal.h"

#include "march.h"

#include <math.h>
#include <stdlib.h>

enum { STEPS = 100000 };

/* Levels, a tee, a dead end, a change of bore; every level the same, and none loses
 * velocity head. */
typedef struct rig {
    kent_build build;
    march march;
    kent_waves *waves;
    kent_ends *ends;
    kent_schedule *schedule;
    const kent_kernel *kernel;
    size_t instant;
} rig;

static void rig_new(rig *r, double capacity)
{
    kent_error err = {0};
    *r = (rig){.build = kent_build_new()};
    kent_build *b = &r->build;
    kent_build_point(b, "R", 0.0, 0.0, 0.0);
    kent_build_point(b, "J", 900.0, 0.0, 0.0);
    kent_build_point(b, "D", 900.0, 350.0, 0.0);
    kent_build_point(b, "K", 1700.0, 0.0, 0.0);
    kent_build_point(b, "E", 2600.0, 0.0, 0.0);
    kent_build_pipe(b, "1", "R J", 0.5, 1000.0);
    kent_build_pipe(b, "2", "J D", 0.2, 1200.0);
    kent_build_pipe(b, "3", "J K", 0.4, 1100.0);
    kent_build_pipe(b, "4", "K E", 0.3, 900.0);
    kent_build_fixed_level(b, "R", 60.0);
    const int v = kent_build_valve(b, "V", "E", capacity, 0.0);
    const int s = kent_build_scenario(b, "shut", 60.0);
    kent_build_ramp(b, s, KENT_EVENT_VALVE, v, 0.0, 2.0, 0.0);
    b->model->solver.friction = KENT_SURGE_NONE;
    r->march = march_new(b, 60.0, -1, NULL, 0, 1);
    const kent_model *m = b->model;
    const kent_steady *steady = r->march.steady;
    bool *implicit = kent_alloc(m->span_count, sizeof *implicit);
    assert_non_null(implicit);
    if (kent_waves_new(m, r->march.grid, implicit, &r->waves, &err) ||
        kent_ends_new(m, steady, r->waves, s, &r->ends, &err) ||
        kent_schedule_new(m, s, &r->schedule, &err) ||
        kent_kernel_pick(NULL, &r->kernel, &err)) {
        fail_msg("%s", err.what);
    }
    free(implicit);
    for (size_t i = 0; i < m->span_count; i++) {
        const double head[2] = {steady->node_head[m->spans[i].node[0]],
                                steady->node_head[m->spans[i].node[1]]};
        kent_waves_set(r->waves, i, head, steady->span_flow[i]);
    }
    r->ends->levels[0].loss = 0.0;
}

static void rig_clear(rig *r)
{
    kent_waves_free(r->waves);
    kent_ends_free(r->ends);
    kent_schedule_free(r->schedule);
    march_clear(&r->march);
    kent_build_clear(&r->build);
}

static void go_on(rig *r, bool events, size_t steps)
{
    const double step = r->march.grid->step;
    for (size_t i = 0; i < steps; i++) {
        assert_int_equal(kent_waves_sweep(r->waves, r->kernel), 0);
        kent_waves_move(r->waves);
        r->instant++;
        if (events) {
            kent_ends_move(r->ends, r->schedule, (double)r->instant * step, step);
        }
        kent_ends_solve(r->ends, r->waves);
    }
}

/* Of the water's motion and its compression around 60 m, J over rho g step/2: of every
 * reach, the squares of the two waves in it, over its impedance. */
static double energy(const rig *r)
{
    const kent_waves *w = r->waves;
    double sum = 0.0;
    for (size_t s = 0; s < w->span_count; s++) {
        for (size_t i = 0; i < w->reaches[s]; i++) {
            const size_t node = w->first[s] + i;
            const double right = w->p[node] - 60.0, left = w->m[node + 1] - 60.0;
            sum += (right * right + left * left) / w->impedance[s];
        }
    }
    return sum;
}

static void a_frictionless_main_keeps_its_energy(void **state)
{
    (void)state;
    rig r;
    rig_new(&r, 0.05);
    const double flowing = energy(&r);
    while ((double)r.instant * r.march.grid->step < 2.5) {
        go_on(&r, true, 1);
    }
    const double shut = energy(&r);
    assert_true(shut > 0.01 * flowing);
    double worst = 0.0;
    for (int i = 0; i < STEPS / 100; i++) {
        go_on(&r, false, 100);
        worst = fmax(worst, fabs(energy(&r) / shut - 1.0));
    }
    print_message("energy strays by %g over %d steps\n", worst, STEPS);
    assert_true(worst <= 1e-11);
    rig_clear(&r);
}

static void turn_round(rig *r)
{
    for (size_t i = 0; i < r->waves->node_total; i++) {
        const double p = r->waves->p[i];
        r->waves->p[i] = r->waves->m[i];
        r->waves->m[i] = p;
    }
}

/* What entered by the valve while it shut is beyond recall; from there on the way back
 * is the way. */
static void a_frictionless_main_finds_its_way_back(void **state)
{
    (void)state;
    rig r;
    rig_new(&r, 0.05);
    while ((double)r.instant * r.march.grid->step < 2.5) {
        go_on(&r, true, 1);
    }
    const size_t n = r.waves->node_total;
    double *kept = kent_alloc(2 * n, sizeof *kept);
    double away = 0.0, back = 0.0; /* m */
    assert_non_null(kept);
    for (size_t i = 0; i < n; i++) {
        kept[i] = r.waves->p[i];
        kept[n + i] = r.waves->m[i];
    }
    go_on(&r, false, 10000);
    for (size_t i = 0; i < n; i++) {
        away = fmax(away, fabs(r.waves->p[i] - kept[i]));
    }
    turn_round(&r);
    go_on(&r, false, 10000);
    turn_round(&r);
    for (size_t i = 0; i < n; i++) {
        back = fmax(back, fabs(r.waves->p[i] - kept[i]));
        back = fmax(back, fabs(r.waves->m[i] - kept[n + i]));
    }
    print_message("waves went %g m away and came back within %g m\n", away, back);
    assert_true(away > 10.0);
    assert_true(back <= 1e-9);
    free(kept);
    rig_clear(&r);
}

/* Heads at both ends of 600 m and in the middle of it, over a closure; cut at the point
 * between reach `joint` and the next one; 0: nowhere. */
static void close_main(size_t joint, double *heads, size_t steps)
{
    enum { REACHES = 12 };
    const double reach = 50.0; /* m */
    const double cut = joint > 0 ? reach * (double)joint : 6.0 * reach;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "J", cut, 0.0, 0.0);
    kent_build_point(&b, "E", REACHES * reach, 0.0, 0.0);
    if (joint == 0) kent_build_pipe(&b, "main", "R J E", 0.4, 1000.0);
    if (joint > 0) kent_build_pipe(&b, "main", "R J", 0.4, 1000.0);
    if (joint > 0) kent_build_pipe(&b, "rest", "J E", 0.4, 1000.0);
    for (size_t i = 0; i < b.model->pipe_count; i++) {
        b.model->pipes[i].friction = KENT_COLEBROOK_WHITE;
        b.model->pipes[i].friction_coefficient = 1e-3;
    }
    kent_build_fixed_level(&b, "R", 60.0);
    const int v = kent_build_valve(&b, "V", "E", 0.02, 0.0);
    const int s = kent_build_scenario(&b, "shut", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.1, 1.0, 0.0);
    b.model->solver.friction = KENT_SURGE_QUASI_STEADY;
    b.model->solver.time_step = reach / 1000.0;
    const kent_watch whole[] = {{0, 0.0}, {0, cut}, {0, REACHES * reach}};
    const kent_watch parts[] = {{0, 0.0}, {1, 0.0}, {1, REACHES * reach - cut}};
    march m = march_new(&b, 60.0, s, joint ? parts : whole, 3, 1);
    kent_trace trace;
    kent_error err = {0};
    for (size_t i = 0; i < steps; i++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        heads[2 * i] = trace.head[0];
        heads[2 * i + 1] = trace.head[2];
    }
    march_clear(&m);
    kent_build_clear(&b);
}

static void a_joint_at_any_grid_point_changes_nothing(void **state)
{
    (void)state;
    enum { COUNT = 1000, HEADS = 2 * COUNT };
    static double whole[HEADS], cut[HEADS];
    close_main(0, whole, COUNT);
    for (size_t joint = 1; joint < 12; joint++) {
        close_main(joint, cut, COUNT);
        for (size_t i = 0; i < HEADS; i++) {
            assert_within(cut[i], whole[i], 1e-9);
        }
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_frictionless_main_keeps_its_energy),
        cmocka_unit_test(a_frictionless_main_finds_its_way_back),
        cmocka_unit_test(a_joint_at_any_grid_point_changes_nothing),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
