/* Worst instants, from traces made by hand. */
#include "kent_check.h"
#include "kent_net.h"

#include <math.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double RHO = 1000.0, G = 9.80665;

/* R - P1 (turns left, level) - P2 (crest) - T (tee with dead end D) - X (reducer) - E.
 */
static kent_build a_main(void)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 20.0);
    (void)kent_build_point(&b, "P1", 500.0, 0.0, 20.0);
    (void)kent_build_point(&b, "P2", 500.0, 300.0, 20.0);
    (void)kent_build_point(&b, "T", 500.0, 500.0, 0.0);
    (void)kent_build_point(&b, "D", 400.0, 500.0, 0.0);
    (void)kent_build_point(&b, "X", 500.0, 700.0, -20.0);
    (void)kent_build_point(&b, "E", 500.0, 900.0, -40.0);
    (void)kent_build_pipe(&b, "A", "R P1 P2 T", 0.5, 1000.0);
    (void)kent_build_pipe(&b, "B", "T X", 0.5, 1000.0);
    (void)kent_build_pipe(&b, "C", "T D", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "F", "X E", 0.4, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 100.0);
    (void)kent_build_outflow(&b, "E", 0.2);
    (void)kent_build_scenario(&b, "first", 10.0);
    (void)kent_build_scenario(&b, "second", 10.0);
    return b;
}

static double area(double diameter) { return 0.25 * PI * diameter * diameter; }

static void a_bend_inside_a_span_is_watched_once(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    /* P1, P2: one each; T: three; X: two; D: one; E, drawn from, ends a pipe as well */
    size_t at_bends = 0;
    for (size_t i = 0; i < n.watch_count; i++) {
        const kent_watch *w = &n.watches[i];
        const bool at_p1 = fabs(w->chainage - 500.0) < 1e-9;
        const bool at_p2 = fabs(w->chainage - 800.0) < 1e-9;
        if (w->span == kent_build_span_of(&n.build, "A") && (at_p1 || at_p2)) {
            at_bends++;
        }
    }
    assert_int_equal(at_bends, 2);
    kent_net_clear(&n);
}

/* The highest pressure comes without flow, the largest flow with little pressure. */
static void a_thrust_comes_from_one_instant(void **state)
{
    (void)state;
    static kent_made t;
    kent_net n = kent_net_of(a_main());
    t.count = 0;
    kent_made_add(&t, &n, 0.0, 100.0, 0.2);
    kent_made_add(&t, &n, 0.1, 180.0, 0.0);
    kent_made_add(&t, &n, 0.2, 60.0, 2.0);
    kent_made_add(&t, &n, 0.3, 90.0, 0.1);
    kent_made_take(&t, &n, 0, 0.1, 64);
    kent_net_finish(&n);

    const kent_instant *worst =
        &kent_net_case(&n, "P1", "first")->worst[KENT_RESULTANT];
    const double half = sin(PI / 4.0), p = RHO * G * (180.0 - 20.0);
    assert_true(worst->time == 0.1);
    assert_close(worst->pressure, p, 1e-12);
    assert_true(worst->balance.port[0].flow == 0.0);
    assert_close(kent_vec3_length(worst->balance.thrust), 2.0 * p * area(0.52) * half,
                 1e-9);
    kent_net_clear(&n);
}

/* ... and where the flow is what makes it worst, it is that instant instead. */
static void momentum_can_decide_the_instant(void **state)
{
    (void)state;
    static kent_made t;
    kent_net n = kent_net_of(a_main());
    t.count = 0;
    kent_made_add(&t, &n, 0.0, 100.0, 0.0);
    kent_made_add(&t, &n, 0.1, 99.9, 0.8);
    kent_made_take(&t, &n, 0, 0.1, 64);
    kent_net_finish(&n);
    const kent_instant *worst =
        &kent_net_case(&n, "P1", "first")->worst[KENT_RESULTANT];
    assert_true(worst->time == 0.1);
    assert_within(worst->balance.port[0].flow, -0.8, 1e-15);
    assert_within(worst->balance.port[1].flow, 0.8, 1e-15);
    kent_net_clear(&n);
}

/* Numbers that look random and are the same everywhere (Lehmer's generator). */
static double shuffled(unsigned long long *seed)
{
    *seed = *seed * 48271ULL % 2147483647ULL;
    return (double)*seed / 2147483647.0;
}

static kent_made *a_storm(const kent_net *n)
{
    static kent_made t;
    unsigned long long seed = 20260112ULL;
    t.count = 0;
    for (size_t row = 0; row < 1000; row++) {
        kent_made_add(&t, n, 0.01 * (double)row, 0.0, 0.0);
        for (size_t i = 0; i < n->watch_count; i++) {
            t.head[row * n->watch_count + i] = 120.0 * shuffled(&seed) - 10.0;
            t.flow[row * n->watch_count + i] = 1.2 * shuffled(&seed) - 0.6;
        }
    }
    return &t;
}

/* The whole balance at one row, written out plainly. */
static kent_vec3 thrust_at(const kent_net *n, const kent_fitting *f, const kent_made *t,
                           size_t row)
{
    const kent_port *ports = &n->model->ports[f->port_first];
    double head[KENT_PORTS] = {0}, speed[KENT_PORTS] = {0};
    size_t widest = 0;
    kent_balance b = {0};
    for (size_t i = 0; i < f->port_count; i++) {
        for (size_t w = 0; w < n->watch_count; w++) {
            const kent_watch *at = &n->watches[w];
            if (at->span != ports[i].span || at->chainage != ports[i].chainage) {
                continue;
            }
            head[i] = t->head[row * n->watch_count + w];
            b.port[i].flow = ports[i].sign * t->flow[row * n->watch_count + w];
            break;
        }
        speed[i] = b.port[i].flow / area(ports[i].inside_diameter);
        if (ports[i].inside_diameter > ports[widest].inside_diameter) widest = i;
    }
    for (size_t i = 0; i < f->port_count; i++) {
        b.port[i].pressure =
            RHO * G * (head[i] - f->at.z) +
            0.5 * RHO * (speed[widest] * speed[widest] - speed[i] * speed[i]);
        b.port[i].momentum_factor =
            kent_port_momentum_factor(n->model, &ports[i], b.port[i].flow);
    }
    kent_balance_sum(ports, f->port_count, RHO, &b);
    return b.thrust;
}

static double measure(kent_vec3 t, int sense)
{
    const double sizes[KENT_SENSES] = {kent_vec3_length(t), hypot(t.x, t.y), t.z, -t.z};
    return sizes[sense];
}

static void the_recorder_finds_what_a_plain_loop_finds(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main());
    const kent_made *t = a_storm(&n);
    static const char *const IDS[] = {"P1", "P2", "T", "X"};
    kent_made_take(t, &n, 0, 0.01, 64);
    kent_net_finish(&n);
    for (size_t k = 0; k < sizeof IDS / sizeof IDS[0]; k++) {
        const kent_fitting *f = kent_net_fitting(&n, IDS[k]);
        const kent_load_case *c = kent_net_case(&n, IDS[k], "first");
        for (int sense = 0; sense < KENT_SENSES; sense++) {
            double want = 0.0;
            for (size_t row = 0; row < t->count; row++) {
                want = fmax(want, measure(thrust_at(&n, f, t, row), sense));
            }
            assert_int_equal(c->worst[sense].set, want > 1e-6);
            if (!c->worst[sense].set) continue;
            const double got = measure(c->worst[sense].balance.thrust, sense);
            assert_close(got, want, 1e-5); /* what beta's constancy may cost at most */
            const size_t row = (size_t)lround(c->worst[sense].time / 0.01);
            assert_close(got, measure(thrust_at(&n, f, t, row), sense), 1e-9);
        }
    }
    kent_net_clear(&n);
}

static void blocks_of_any_size_give_the_same_bits(void **state)
{
    (void)state;
    kent_build built = a_main();
    const int note = kent_build_note(&built, "T");
    built.model->notes[note].face = 0.6;
    kent_net n = kent_net_of(built);
    const kent_made *t = a_storm(&n);
    kent_load_case want[4];
    static const char *const IDS[] = {"P1", "P2", "T", "X"};
    static const size_t BLOCKS[] = {1000, 1, 7, 64};
    for (size_t k = 0; k < sizeof BLOCKS / sizeof BLOCKS[0]; k++) {
        kent_made_take(t, &n, 0, 0.0001, BLOCKS[k]);
        kent_net_finish(&n);
        for (size_t i = 0; i < 4; i++) {
            const kent_load_case *got = kent_net_case(&n, IDS[i], "first");
            if (k == 0) want[i] = *got;
            for (int sense = 0; sense < KENT_SENSES; sense++) {
                const kent_instant *a = &got->worst[sense], *b = &want[i].worst[sense];
                assert_int_equal(a->set, b->set);
                if (!a->set) continue;
                assert_true(a->time == b->time);
                assert_memory_equal(&a->balance.thrust, &b->balance.thrust,
                                    sizeof a->balance.thrust);
            }
            assert_true(got->above_90_percent == want[i].above_90_percent);
        }
    }
    kent_net_clear(&n);
}

/* A head that rises and falls in straight lines; the thrust of a bend follows it. */
static void time_above_nine_tenths_of_the_peak_is_counted(void **state)
{
    (void)state;
    static kent_made t;
    kent_net n = kent_net_of(a_main());
    const double step = 0.01;
    size_t want = 0;
    t.count = 0;
    for (int k = 0; k <= 1000; k++) {
        const double rise = 100.0 * (1.0 - fabs(k - 400.0) / 600.0); /* m over P1 */
        kent_made_add(&t, &n, step * k, 20.0 + rise, 0.0);
        if (rise >= 90.0) want++;
    }
    kent_made_take(&t, &n, 0, step, 64);
    kent_net_finish(&n);
    const double got = kent_net_case(&n, "P1", "first")->above_90_percent;
    assert_within(got, step * (double)want,
                  1.01 * step); /* one at the very threshold */
    assert_true(isnan(kent_net_case(&n, "P1", "steady")->above_90_percent));
    kent_net_clear(&n);
}

static void a_peak_of_one_instant_lasts_one_step(void **state)
{
    (void)state;
    static kent_made t;
    kent_net n = kent_net_of(a_main());
    t.count = 0;
    for (int k = 0; k < 50; k++) {
        kent_made_add(&t, &n, 0.02 * k, k == 20 ? 200.0 : 60.0, 0.0);
    }
    kent_made_take(&t, &n, 0, 0.02, 64);
    kent_net_finish(&n);
    assert_close(kent_net_case(&n, "P1", "first")->above_90_percent, 0.02, 1e-12);
    assert_true(kent_net_case(&n, "P1", "first")->step == 0.02);
    assert_true(isnan(kent_net_case(&n, "P1", "steady")->step));
    kent_net_clear(&n);
}

static void starting_again_forgets_the_coarser_grid(void **state)
{
    (void)state;
    static kent_made t;
    kent_net n = kent_net_of(a_main());
    t.count = 0;
    kent_made_add(&t, &n, 0.0, 300.0, 0.0);
    kent_made_take(&t, &n, 0, 0.1, 64);
    t.count = 0;
    kent_made_add(&t, &n, 0.0, 120.0, 0.0);
    kent_made_add(&t, &n, 0.05, 110.0, 0.0);
    kent_made_take(&t, &n, 0, 0.05, 64);
    kent_net_finish(&n);
    const kent_load_case *c = kent_net_case(&n, "P1", "first");
    assert_close(c->worst[KENT_RESULTANT].pressure, RHO * G * 100.0, 1e-12);
    assert_close(c->above_90_percent, 0.1, 1e-12);
    kent_net_clear(&n);
}

static void scenarios_are_kept_apart(void **state)
{
    (void)state;
    static kent_made t;
    kent_net n = kent_net_of(a_main());
    for (int s = 1; s >= 0; s--) { /* in any order */
        t.count = 0;
        kent_made_add(&t, &n, 0.0, 120.0 + 30.0 * s, 0.0);
        kent_made_take(&t, &n, s, 0.1, 64);
    }
    kent_net_finish(&n);
    const kent_load_case *first = kent_net_case(&n, "P1", "first");
    const kent_load_case *second = kent_net_case(&n, "P1", "second");
    assert_close(first->worst[KENT_RESULTANT].pressure, RHO * G * 100.0, 1e-12);
    assert_close(second->worst[KENT_RESULTANT].pressure, RHO * G * 130.0, 1e-12);
    assert_int_equal(first->scenario, 0);
    assert_int_equal(second->scenario, 1);
    kent_net_clear(&n);
}

static void a_sense_that_never_occurs_is_not_set(void **state)
{
    (void)state;
    static kent_made t;
    kent_net n = kent_net_of(a_main());
    t.count = 0;
    kent_made_add(&t, &n, 0.0, 100.0, 0.2);
    kent_made_take(&t, &n, 0, 0.1, 64);
    kent_net_finish(&n);
    const kent_load_case *level = kent_net_case(&n, "P1", "first");
    assert_true(level->worst[KENT_SIDEWAYS].set);
    assert_false(level->worst[KENT_UPWARD].set);
    assert_false(level->worst[KENT_DOWNWARD].set);
    const kent_load_case *crest = kent_net_case(&n, "P2", "first");
    assert_true(crest->worst[KENT_UPWARD].set);
    assert_false(crest->worst[KENT_DOWNWARD].set);
    kent_net_clear(&n);
}

/* P1 with 1 m to each port: 2 x 2 m at 1000 m/s there and back, 4 ms. Its flow stops at
 * once, when pressure is highest. */
static kent_vec3 unsteady_of_a_sudden_stop(double step)
{
    static kent_made t;
    kent_build b = a_main();
    const int note = kent_build_note(&b, "P1");
    b.model->notes[note].face = 1.0;
    kent_net n = kent_net_of(b);
    const int before = (int)lround(0.02 / step);
    t.count = 0;
    for (int k = 0; k < 2 * before; k++) {
        const double head = k == before ? 200.0 : k > before ? 199.0 : 100.0;
        kent_made_add(&t, &n, step * k, head, k >= before ? 0.0 : 0.3);
    }
    kent_made_take(&t, &n, 0, step, 3);
    kent_net_finish(&n);
    const kent_instant *worst =
        &kent_net_case(&n, "P1", "first")->worst[KENT_RESULTANT];
    const kent_vec3 unsteady = worst->balance.unsteady;
    assert_close(worst->time, 0.02, 1e-12);
    kent_net_clear(&n);
    return unsteady;
}

static void changing_flow_is_taken_over_a_waves_crossing(void **state)
{
    (void)state;
    /* - rho dQ/dt r: flow into port 0 loses 0.3 in 4 ms, and so does that out of 1 */
    const double want = RHO * 0.3 / 0.004;
    static const double STEPS[] = {0.004, 0.002, 0.001, 0.0005};
    for (size_t k = 0; k < sizeof STEPS / sizeof STEPS[0]; k++) {
        const kent_vec3 got = unsteady_of_a_sudden_stop(STEPS[k]);
        assert_close(got.x, want, 1e-9);
        assert_close(got.y, want, 1e-9);
    }
    assert_close(unsteady_of_a_sudden_stop(0.02).x, RHO * 0.3 / 0.02, 1e-9);
}

/* The fitting hangs at P1, 500 m along; a fall to -30 m pulls less than 150 m push. */
static void the_instants_of_lowest_and_highest_head_are_kept(void **state)
{
    (void)state;
    static kent_made t;
    kent_net n = kent_net_of(a_main());
    t.count = 0;
    kent_made_add(&t, &n, 0.0, 100.0, 0.3);
    kent_made_add(&t, &n, 0.1, 150.0, 0.1);
    kent_made_add(&t, &n, 0.2, -30.0, -0.2);
    kent_made_add(&t, &n, 0.3, 90.0, 0.0);
    kent_made_take(&t, &n, 0, 0.1, 2);
    kent_net_finish(&n);
    const kent_load_case *c = kent_net_case(&n, "P1", "first");
    assert_true(c->lowest.set && c->lowest.time == 0.2);
    assert_true(c->highest.set && c->highest.time == 0.1);
    assert_true(c->lowest.pressure < 0.0);
    assert_true(c->lowest.balance.port[0].flow == 0.2); /* of the same instant */
    assert_false(kent_net_case(&n, "P1", "steady")->lowest.set);
    kent_net_clear(&n);
}

static void changing_flow_never_chooses_the_instant(void **state)
{
    (void)state;
    static kent_made t;
    kent_build b = a_main();
    const int note = kent_build_note(&b, "P1");
    b.model->notes[note].face = 1.0;
    kent_net n = kent_net_of(b);
    t.count = 0;
    kent_made_add(&t, &n, 0.0, 100.0, 0.3);
    kent_made_add(&t, &n, 0.1, 150.0, 0.3);
    kent_made_add(&t, &n, 0.2, 149.9, -0.3); /* a violent change, a little less head */
    kent_made_take(&t, &n, 0, 0.1, 64);
    kent_net_finish(&n);
    const kent_load_case *c = kent_net_case(&n, "P1", "first");
    for (int sense = KENT_RESULTANT; sense <= KENT_SIDEWAYS; sense++) {
        assert_true(c->worst[sense].time == 0.1);
        assert_true(c->worst[sense].balance.unsteady.x == 0.0);
    }
    kent_net_clear(&n);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_bend_inside_a_span_is_watched_once),
        cmocka_unit_test(a_thrust_comes_from_one_instant),
        cmocka_unit_test(momentum_can_decide_the_instant),
        cmocka_unit_test(the_recorder_finds_what_a_plain_loop_finds),
        cmocka_unit_test(blocks_of_any_size_give_the_same_bits),
        cmocka_unit_test(time_above_nine_tenths_of_the_peak_is_counted),
        cmocka_unit_test(a_peak_of_one_instant_lasts_one_step),
        cmocka_unit_test(starting_again_forgets_the_coarser_grid),
        cmocka_unit_test(scenarios_are_kept_apart),
        cmocka_unit_test(a_sense_that_never_occurs_is_not_set),
        cmocka_unit_test(changing_flow_is_taken_over_a_waves_crossing),
        cmocka_unit_test(the_instants_of_lowest_and_highest_head_are_kept),
        cmocka_unit_test(changing_flow_never_chooses_the_instant),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
