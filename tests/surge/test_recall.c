/* Friction that remembers and walls that creep. */
#include "kent_recall_internal.h"
#include "march.h"

#include <float.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

static const double G = 9.81; /* m/s2, as in the published answers */
static const double PI = 3.14159265358979323846;

/* ---- one pipe between a level and a valve that shuts at once ----------------------
 */

typedef struct line {
    double length, speed, bore, v0; /* m, m/s, m, m/s */
    double viscosity;               /* m2/s */
    kent_surge_friction friction;
    int reaches;
    bool creeps;
} line;

/* E. L. Holmboe and W. T. Rouleau, J. Basic Engineering, 1967 (from memory): laminar.
 */
static const line OIL = {36.09, 1324.0, 0.025, 0.128, 3.967e-5, KENT_SURGE_UNSTEADY,
                         160,   false};
/* D. Covas et al., J. Hydraulic Research, 2004 and 2005 (from memory): polyethylene,
 * wall 6.3 mm. 100 times slower than theirs: without friction the answer is the same
 * share of a V0/g, and the velocity head at the level, that it knows nothing of, is
 * nil. */
static const line PLASTIC = {277.0, 395.0,           0.0506, 0.00497,
                             1e-6,  KENT_SURGE_NONE, 160,    true};
static const kent_creep ELEMENTS[] = {{0.05, 1.057e-10},
                                      {0.5, 1.054e-10},
                                      {1.5, 0.9051e-10},
                                      {5.0, 2.617e-10},
                                      {10.0, 7.456e-10}};
enum { ELEMENT_COUNT = sizeof ELEMENTS / sizeof ELEMENTS[0] };

/* Every pipe creeps so, thin walled and free to move: constraint factor 1. */
static void add_creep(kent_build *b, double wall, const kent_creep *element,
                      size_t count)
{
    kent_model *m = b->model;
    m->creep = kent_alloc(count, sizeof *m->creep);
    assert_non_null(m->creep);
    memcpy(m->creep, element, count * sizeof *element);
    m->creep_count = count;
    m->solver.creep = true;
    for (size_t i = 0; i < m->pipe_count; i++) {
        m->pipes[i].creep_count = count;
        m->pipes[i].wall = wall;
        m->pipes[i].outside_diameter = m->pipes[i].inside_diameter + 2.0 * wall;
        m->pipes[i].thin_wall = true;
    }
}

static kent_build build_line(const line *l)
{
    kent_build b = kent_build_new();
    b.model->gravity = G;
    b.model->water.viscosity = l->viscosity * b.model->water.density;
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", l->length, 0.0, 0.0);
    const int p = kent_build_pipe(&b, "main", "R E", l->bore, l->speed);
    b.model->pipes[p].friction =
        l->friction == KENT_SURGE_NONE ? KENT_FRICTIONLESS : KENT_COLEBROOK_WHITE;
    kent_build_fixed_level(&b, "R", 50.0);
    const int v = kent_build_valve(&b, "V", "E", (double)NAN, 0.0);
    b.model->valves[v].flow = l->v0 * PI * 0.25 * l->bore * l->bore;
    const int s = kent_build_scenario(&b, "shut", 1000.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 0.0, 0.0, 0.0);
    b.model->solver.friction = l->friction;
    b.model->solver.time_step = l->length / l->speed / l->reaches;
    if (l->creeps) add_creep(&b, 0.0063, ELEMENTS, ELEMENT_COUNT);
    return b;
}

/* The largest gap between heads at the valve, less the steady one and over a V0/g, and
 * those wanted at so many L/a. */
static double gap_at_valve(const line *l, const double *when, const double *want,
                           size_t count)
{
    kent_build b = build_line(l);
    const kent_watch valve = {0, l->length};
    march m = march_new(&b, 10.0, 0, &valve, 1, 1);
    const double steady = m.steady->node_head[b.model->spans[0].node[1]];
    double worst = 0.0;
    for (size_t i = 0; i < count; i++) {
        double head = 0.0, flow = 0.0;
        march_until(&m, when[i] * l->length / l->speed, &head, &flow);
        const double rise = (head - steady) * G / (l->speed * l->v0);
        assert_true(isfinite(rise));
        worst = fmax(worst, fabs(rise - want[i]));
    }
    march_clear(&m);
    kent_build_clear(&b);
    return worst;
}

/* Laplace inversion of the exact laminar line (W. Zielke 1968), derived. */
static void laminar_flow_remembers_as_laplace_inversion_says(void **state)
{
    (void)state;
    static const double when[] = {0.5, 1.0, 1.5, 1.9, 3.0, 5.0}; /* L/a */
    static const double want[] = {1.06997, 1.10118,  1.12607,
                                  1.14357, -0.77123, 0.77648};
    double last = INFINITY;
    for (int reaches = 20; reaches <= 640; reaches *= 2) {
        line l = OIL;
        l.reaches = reaches;
        const double gap = gap_at_valve(&l, when, want, 6);
        print_message("%d reaches: within %.5f\n", reaches, gap);
        assert_true(gap < 0.02); /* even of 20 reaches */
        assert_true(gap < 0.7 * last);
        last = gap;
    }
    assert_true(last < 0.002);
}

/* The same of the creeping wall: continuity with 2 d(retarded strain)/dt, constraint
 * factor 1, density 1000 kg/m3; derived. */
static void a_creeping_wall_yields_as_laplace_inversion_says(void **state)
{
    (void)state;
    static const double when[] = {0.5, 1.9, 3.0}; /* L/a */
    static const double want[] = {0.88173, 0.80387, -0.67231};
    double last = INFINITY;
    for (int reaches = 80; reaches <= 640; reaches *= 2) {
        line l = PLASTIC;
        l.reaches = reaches;
        const double gap = gap_at_valve(&l, when, want, 3);
        print_message("%d reaches: within %.5f\n", reaches, gap);
        assert_true(gap < 0.01);
        assert_true(gap < 0.55 * last); /* of first order */
        last = gap;
    }
    assert_true(last < 0.001);
}

/* A wall that follows within a step is an elastic one of a smaller modulus: waves go
 * slower by sqrt(1 + a^2 rho D J/e) and nothing rings or grows, whatever the step. */
static void a_wall_that_follows_at_once_slows_the_wave(void **state)
{
    (void)state;
    const double softness = 395.0 * 395.0 * 1000.0 * 0.0506 / 0.0063;
    const kent_creep quick = {1e-6, 0.44 / softness};
    const kent_watch valve = {0, PLASTIC.length};
    line l = PLASTIC;
    l.creeps = false;
    kent_build b = build_line(&l);
    add_creep(&b, 0.0063, &quick, 1);
    march m = march_new(&b, 100.0, 0, &valve, 1, 1);
    const double period = 4.0 * l.length / (395.0 / sqrt(1.44)),
                 joukowsky = 395.0 / 1.2 * l.v0 / G;
    const double steady = m.steady->node_head[b.model->spans[0].node[1]];
    double head = 0.0, flow = 0.0;
    for (int i = 0; i < 5; i++) {
        march_until(&m, (i + 0.25) * period, &head, &flow);
        assert_within((head - steady) / joukowsky, 1.0, 0.05);
        march_until(&m, (i + 0.75) * period, &head, &flow);
        assert_within((head - steady) / joukowsky, -1.0, 0.05);
    }
    march_clear(&m);
    kent_build_clear(&b);
}

/* A line of thick oil whose head falls by 20 m to the valve, shut: in the end it stands
 * under the level all along and the walls have crept. What came in is the compliance
 * of water and wall, all elements in full, times the mean rise. */
static void what_the_walls_take_up_has_come_in(void **state)
{
    (void)state;
    const line l = {277.0, 395.0, 0.0506, 0.5, 1.14e-4, KENT_SURGE_QUASI_STEADY,
                    400,   true};
    const kent_watch ends[] = {{0, 0.0}, {0, l.length}};
    kent_build b = build_line(&l);
    march m = march_new(&b, 300.0, 0, ends, 2, 1);
    const kent_span *span = &b.model->spans[0];
    const double mean_rise = 50.0 - 0.5 * (m.steady->node_head[span->node[0]] +
                                           m.steady->node_head[span->node[1]]);
    const double elastic = G * span->area / (l.speed * l.speed); /* m2 */
    double late = 0.0, came = 0.0, last = 0.0;
    for (int i = 0; i < ELEMENT_COUNT; i++) {
        late += ELEMENTS[i].compliance * l.speed * l.speed * 1000.0 * l.bore / 0.0063;
    }
    kent_trace trace;
    kent_error err = {0};
    for (int step = 0; step * m.grid->step < 300.0; step++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        const double in = trace.flow[0] - trace.flow[1];
        if (step > 0) came += 0.5 * (in + last) * m.grid->step;
        last = in;
    }
    assert_true(mean_rise > 8.0);
    assert_within(trace.head[1], 50.0, 0.001);
    assert_close(came, elastic * (1.0 + late) * l.length * mean_rise, 0.002);
    march_clear(&m);
    kent_build_clear(&b);
}

/* ---- the passes alone -------------------------------------------------------------
 */

typedef struct recall { /* of one pipe */
    kent_build build;
    march march;
    kent_recall *recall;
    kent_waves *waves;
    const kent_kernel *kernel;
} recall;

static recall recall_new(const line *l)
{
    const bool implicit = false;
    kent_error err = {0};
    recall r = {.build = build_line(l)};
    r.march = march_new(&r.build, 10.0, -1, NULL, 0, 1);
    if (kent_kernel_pick("base", &r.kernel, &err) != KENT_OK ||
        kent_waves_new(r.build.model, r.march.grid, &implicit, &r.waves, &err) !=
            KENT_OK ||
        kent_recall_new(r.build.model, r.march.steady, r.march.grid, r.waves, &r.recall,
                        &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    kent_recall_start(r.recall, r.waves); /* of nil */
    return r;
}

static void recall_clear(recall *r)
{
    kent_recall_free(r->recall);
    kent_waves_free(r->waves);
    march_clear(&r->march);
    kent_build_clear(&r->build);
}

static double noise(unsigned *seed)
{
    *seed = *seed * 1664525u + 1013904223u;
    return (double)(*seed >> 8) / 8388608.0 - 1.0;
}

/* What comes at a node: wild, slow, to and fro every step, a jump. */
static double course(int kind, int step, unsigned *seed)
{
    switch (kind) {
    case 0:
        return noise(seed);
    case 1:
        return sin(0.001 * step);
    case 2:
        return step % 2 ? 1.0 : -1.0;
    default:
        return step > 10 ? 1.0 : 0.0;
    }
}

/* p^2 + m^2 is the energy of what passes a node. Over any past, both passes together
 * have never given out more than they took in. */
static void no_past_ever_gives_energy_back(void **state)
{
    (void)state;
    const line lines[] = {
        OIL,
        {36.09, 1324.0, 0.025, 0.128, 3.967e-5, KENT_SURGE_UNSTEADY, 1, true},
        {36.09, 50.0, 0.025, 1e-9, 3.967e-5, KENT_SURGE_UNSTEADY, 20, true},
        {277.0, 395.0, 0.0506, 0.497, 1e-6, KENT_SURGE_UNSTEADY, 100, true},
        {277.0, 395.0, 0.0506, 0.497, 1e-6, KENT_SURGE_UNSTEADY, 1, true},
        {9000.0, 1000.0, 1.0, 1.5, 1e-6, KENT_SURGE_UNSTEADY, 9, true}};
    unsigned seed = 7;
    for (size_t i = 0; i < sizeof lines / sizeof lines[0]; i++) {
        for (int kind = 0; kind < 4; kind++) {
            recall r = recall_new(&lines[i]);
            double taken = 0.0, came = 0.0;
            for (int step = 0; step < 5000; step++) {
                double *p = r.waves->p, *m = r.waves->m;
                const double d = course(kind, step, &seed);
                const double h = course(kind, step + 5, &seed);
                p[0] = h + d;
                m[0] = h - d;
                const double before = p[0] * p[0] + m[0] * m[0];
                kent_recall_pull(r.recall, r.kernel, r.waves);
                kent_recall_yield(r.recall, r.kernel, r.waves);
                taken += before - (p[0] * p[0] + m[0] * m[0]);
                came += before;
                assert_true(taken >= -1e-12 * came);
            }
            assert_true(taken > 0.0);
            recall_clear(&r);
        }
    }
}

/* Of a jump of d by 1 the first loss is twice the integral of W over the step, less
 * what it slows itself. */
static void the_first_pull_is_the_integral_of_the_weight(void **state)
{
    (void)state;
    recall r = recall_new(&OIL);
    const double step = 4.0 * OIL.viscosity * OIL.length / OIL.speed / OIL.reaches /
                        (OIL.bore * OIL.bore);
    double integral = 0.0; /* of Zielke's series for short times */
    static const double early[] = {0.282095, -1.25,    1.057855,
                                   0.9375,   0.396696, -0.351563};
    for (int i = 0; i < 6; i++) {
        integral += early[i] * pow(step, 0.5 * (i + 1)) / (0.5 * (i + 1));
    }
    r.waves->p[0] = 0.5;
    r.waves->m[0] = -0.5;
    kent_recall_pull(r.recall, r.kernel, r.waves);
    assert_close(0.5 - r.waves->p[0], 2.0 * integral / (1.0 + 2.0 * integral), 0.003);
    recall_clear(&r);
}

/* Integral of the turbulent weight from 0 to tau, by hand. */
static double turbulent_integral(double tau, double c)
{
    return 0.5 * sqrt(c) * erf(sqrt(tau / c));
}

/* The recursion against the convolution with the whole past, the weight itself. */
static void the_sum_recalls_what_the_whole_past_says(void **state)
{
    (void)state;
    enum { STEPS = 3000 };
    const line l = {1000.0, 1000.0, 0.3, 1.2, 1e-6, KENT_SURGE_UNSTEADY, 100, false};
    recall r = recall_new(&l);
    const double c = kent_shear_decay(l.v0 * l.bore / l.viscosity);
    const double step = 4.0 * l.viscosity * 0.01 / (l.bore * l.bore);
    double change[STEPS], last = 0.0, worst = 0.0, largest = 0.0;
    unsigned seed = 3;
    for (int now = 0; now < STEPS; now++) {
        const double d =
            sin(0.02 * now) + (now > 1000 ? 0.5 : 0.0) + 0.1 * noise(&seed);
        r.waves->p[0] = 0.5 * d;
        r.waves->m[0] = -0.5 * d;
        kent_recall_pull(r.recall, r.kernel, r.waves);
        const double pull = 0.5 * d - r.waves->p[0], mean = d - pull;
        double want = 0.0;
        change[now] = mean - last;
        last = mean;
        for (int then = 0; then <= now; then++) {
            const double ago = (now - then) * step;
            want += 2.0 * change[then] *
                    (turbulent_integral(ago + step, c) - turbulent_integral(ago, c));
        }
        worst = fmax(worst, fabs(pull - want));
        largest = fmax(largest, fabs(want));
    }
    print_message("within %.2g of at most %.3g\n", worst, largest);
    assert_true(worst < 0.003 * largest);
    recall_clear(&r);
}

/* ---- networks ---------------------------------------------------------------------
 */

/* A loop, a stiff branch, a branch at rest, one that hardly flows: plastic, all that
 * remembers is on. Invented. */
static kent_build village(void)
{
    static const struct {
        const char *id;
        double x, y, z;
    } point[] = {{"R", 0, 0, 30},    {"A", 400, 0, 20},  {"B", 800, 200, 10},
                 {"C", 900, 0, 12},  {"D", 1300, 0, 5},  {"X", 500, 500, 8},
                 {"Y", 900, 600, 3}, {"Z", 1200, 300, 2}};
    static const struct {
        const char *route;
        double bore, speed;
    } pipe[] = {{"R A", 0.3, 350.0},  {"A B", 0.2, 380.0}, {"A C", 0.15, 400.0},
                {"B C", 0.1, 420.0},  {"C D", 0.2, 360.0}, {"A X", 0.1, 400.0},
                {"B Y", 0.05, 450.0}, {"C Z", 0.02, 450.0}};
    kent_build b = kent_build_new();
    for (size_t i = 0; i < sizeof point / sizeof point[0]; i++) {
        kent_build_point(&b, point[i].id, point[i].x, point[i].y, point[i].z);
    }
    for (size_t i = 0; i < sizeof pipe / sizeof pipe[0]; i++) {
        const int p = kent_build_pipe(&b, pipe[i].route, pipe[i].route, pipe[i].bore,
                                      pipe[i].speed);
        b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
        b.model->pipes[p].friction_coefficient = 0.0001;
    }
    kent_build_fixed_level(&b, "R", 60.0);
    kent_build_outflow(&b, "Y", 1e-6);
    kent_build_outflow(&b, "Z", 0.0003);
    const int v = kent_build_valve(&b, "V", "D", 0.005, 5.0);
    const int s = kent_build_scenario(&b, "shut", 60.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 1.0, 2.0, 0.0);
    b.model->solver.friction = KENT_SURGE_UNSTEADY;
    b.model->solver.min_reaches = 4;
    add_creep(&b, 0.012, ELEMENTS, ELEMENT_COUNT);
    return b;
}

static void run(kent_marcher *k, size_t steps)
{
    kent_trace trace;
    kent_error err = {0};
    for (size_t done = 0; done < steps; done += trace.count) {
        const size_t want = steps - done < 1000 ? steps - done : 1000;
        if (kent_marcher_advance(k, want, &trace, &err) != want) {
            fail_msg("%s", err.what);
        }
    }
}

static const kent_watch VALVE = {4, 400.0};

static void without_an_event_nothing_changes(void **state)
{
    (void)state;
    kent_build b = village();
    march m = march_new(&b, 60.0, -1, &VALVE, 1, 1000);
    double high[500], low[500], worst = 0.0;
    assert_true(fabs(m.steady->span_flow[0]) / b.model->spans[0].area > 0.3); /* m/s */
    run(m.marcher, 100001);
    for (size_t s = 0; s < b.model->span_count; s++) {
        assert_true(m.grid->reaches[s] < 500);
        kent_marcher_envelope(m.marcher, (int)s, high, low);
        for (int i = 0; i <= m.grid->reaches[s]; i++) {
            worst = fmax(worst, high[i] - low[i]);
        }
    }
    print_message("moved by %.2g m\n", worst);
    assert_within(worst, 0.0, 1e-9);
    march_clear(&m);
    kent_build_clear(&b);
}

static void a_surge_gives_the_same_bits_with_every_kernel(void **state)
{
    (void)state;
    static const char *const level[] = {"base", "avx2", "avx512"};
    kent_build b = village();
    march m = march_new(&b, 60.0, 0, &VALVE, 1, 1000);
    double want[2][500], got[2][500];
    run(m.marcher, 3000);
    kent_marcher_profile(m.marcher, 0, want[0], want[1]);
    for (int i = 0; i < 3; i++) {
        kent_marcher *k = NULL;
        kent_error err = {0};
        assert_int_equal(setenv("KENTLEDGE_SIMD", level[i], 1), 0);
        if (kent_marcher_new(b.model, m.steady, m.grid, 0, &VALVE, 1, 1000, &k, &err) !=
            KENT_OK) {
            print_message("not compared: %s\n", err.what);
            assert_true(i > 0); /* base is always there */
            continue;
        }
        run(k, 3000);
        kent_marcher_profile(k, 0, got[0], got[1]);
        for (int row = 0; row < 2; row++) {
            assert_memory_equal(got[row], want[row],
                                ((size_t)m.grid->reaches[0] + 1) * sizeof got[0][0]);
        }
        kent_marcher_free(k);
    }
    assert_int_equal(unsetenv("KENTLEDGE_SIMD"), 0);
    march_clear(&m);
    kent_build_clear(&b);
}

/* Swing of the head at the valve between 40 s and 60 s, m. */
static double late_swing(bool remembers, bool creeps)
{
    kent_build b = village();
    if (!remembers) b.model->solver.friction = KENT_SURGE_QUASI_STEADY;
    b.model->solver.creep = creeps;
    march m = march_new(&b, 60.0, 0, &VALVE, 1, 1000);
    kent_trace trace;
    kent_error err = {0};
    double high = -INFINITY, low = INFINITY;
    for (int step = 0; step * m.grid->step < 60.0; step++) {
        assert_int_equal(kent_marcher_advance(m.marcher, 1, &trace, &err), 1);
        if (trace.time[0] < 40.0) continue;
        high = fmax(high, trace.head[0]);
        low = fmin(low, trace.head[0]);
    }
    march_clear(&m);
    kent_build_clear(&b);
    return high - low;
}

static void either_makes_a_surge_die_sooner(void **state)
{
    (void)state;
    const double plain = late_swing(false, false), memory = late_swing(true, false),
                 creep = late_swing(false, true), both = late_swing(true, true);
    print_message(
        "swing after 40 s: %.3f, remembered %.3f, creeping %.3f, both %.3f m\n", plain,
        memory, creep, both);
    assert_true(memory < plain && creep < plain && both < creep);
}

/* Creep without solver.creep, and memory without friction, are not there at all. */
static void what_is_not_asked_for_costs_nothing(void **state)
{
    (void)state;
    kent_build b = village();
    kent_error err = {0};
    const bool implicit[8] = {false};
    b.model->solver.creep = false;
    b.model->solver.friction = KENT_SURGE_QUASI_STEADY;
    march m = march_new(&b, 60.0, -1, &VALVE, 1, 1);
    kent_waves *w = NULL;
    kent_recall *r = NULL;
    assert_int_equal(kent_waves_new(b.model, m.grid, implicit, &w, &err), KENT_OK);
    assert_int_equal(kent_recall_new(b.model, m.steady, m.grid, w, &r, &err), KENT_OK);
    assert_null(r);
    for (size_t i = 0; i < b.model->span_count; i++) {
        b.model->spans[i].friction.law = KENT_FRICTIONLESS;
    }
    b.model->solver.friction = KENT_SURGE_UNSTEADY;
    assert_int_equal(kent_recall_new(b.model, m.steady, m.grid, w, &r, &err), KENT_OK);
    assert_null(r);
    kent_waves_free(w);
    march_clear(&m);
    kent_build_clear(&b);
}

static void a_wall_that_is_not_known_cannot_creep(void **state)
{
    (void)state;
    kent_build b = village();
    march m = march_new(&b, 60.0, -1, &VALVE, 1, 1);
    kent_marcher *k = NULL;
    kent_error err = {0};
    b.model->pipes[2].thin_wall = false;
    b.model->pipes[2].poisson = (double)NAN;
    assert_int_equal(
        kent_marcher_new(b.model, m.steady, m.grid, 0, &VALVE, 1, 1, &k, &err),
        KENT_E_INPUT);
    assert_string_equal(err.where, "built.cfg:102");
    assert_non_null(strstr(err.what, "poisson_ratio: give them, or set creep = false"));
    march_clear(&m);
    kent_build_clear(&b);
}

/* Beside a wave speed the wall need not be stated: it is what lies between the
 * diameters. a^2 rho c1 D/e by hand. */
static void a_wall_is_what_lies_between_the_diameters(void **state)
{
    (void)state;
    kent_build b = build_line(&PLASTIC);
    kent_build_derive(&b);
    const double want = 395.0 * 395.0 * 1000.0 * 0.0506 / 0.0063;
    const kent_span *span = &b.model->spans[0];
    assert_close(kent_recall_softness(b.model, span, 395.0), want, 1e-12);
    b.model->pipes[0].wall = (double)NAN;
    assert_close(kent_recall_softness(b.model, span, 395.0), want, 1e-12);
    b.model->pipes[0].thin_wall = false;
    b.model->pipes[0].poisson = 0.4;
    b.model->pipes[0].axial_support = KENT_FIXED_THROUGHOUT;
    const double c1 = 2.0 * 0.0063 / 0.0506 * 1.4 + 0.0506 / 0.0569 * 0.84; /* 2.5 */
    assert_close(kent_recall_softness(b.model, span, 395.0), c1 * want, 1e-12);
    kent_build_clear(&b);
}

/* A Reynolds number that fits: that of the steady flow, or of 1 m/s where it is slow.
 */
static void a_span_remembers_by_its_steady_flow(void **state)
{
    (void)state;
    static const double speed[] = {0.2, 2.0, 0.049, 1e-9};
    static const double counts[] = {0.2, 2.0, 1.0, 1.0};
    for (int i = 0; i < 4; i++) {
        const line l = {1000.0, 1000.0, 0.3, speed[i], 1e-6, KENT_SURGE_UNSTEADY,
                        100,    false};
        recall r = recall_new(&l);
        const kent_weighting want =
            kent_weighting_sum(counts[i] * 0.3 / 1e-6, 4e-6 * 0.01 / 0.09);
        assert_int_equal(r.recall->pulls[0].terms, want.count);
        assert_close(r.recall->pulls[0].fade[0],
                     exp(-want.rate[0] * 4e-6 * 0.01 / 0.09), 1e-9);
        recall_clear(&r);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(laminar_flow_remembers_as_laplace_inversion_says),
        cmocka_unit_test(a_creeping_wall_yields_as_laplace_inversion_says),
        cmocka_unit_test(a_wall_that_follows_at_once_slows_the_wave),
        cmocka_unit_test(what_the_walls_take_up_has_come_in),
        cmocka_unit_test(no_past_ever_gives_energy_back),
        cmocka_unit_test(the_first_pull_is_the_integral_of_the_weight),
        cmocka_unit_test(the_sum_recalls_what_the_whole_past_says),
        cmocka_unit_test(without_an_event_nothing_changes),
        cmocka_unit_test(a_surge_gives_the_same_bits_with_every_kernel),
        cmocka_unit_test(either_makes_a_surge_die_sooner),
        cmocka_unit_test(what_is_not_asked_for_costs_nothing),
        cmocka_unit_test(a_wall_that_is_not_known_cannot_creep),
        cmocka_unit_test(a_wall_is_what_lies_between_the_diameters),
        cmocka_unit_test(a_span_remembers_by_its_steady_flow),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
