#include "kent_alloc_fail.h"
#include "kent_build.h"
#include "kent_check.h"
#include "kent_steady.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double NONE = (double)NAN;
static const double G = 9.80665; /* m/s2, of kent_build's models */
static const double PI = 3.14159265358979323846;

static double area_of(double bore) { return PI * bore * bore / 4.0; }

/* A point of a straight line along x. */
static void add_point(kent_build *b, const char *id, double x, double z)
{
    kent_build_point(b, id, x, 0.0, z);
}

/* A pipe with a fixed Darcy factor and a stated length. */
static int add_pipe(kent_build *b, const char *id, const char *route, double bore,
                    double length, double factor)
{
    const int p = kent_build_pipe(b, id, route, bore, 1000.0);
    b->model->pipes[p].friction = KENT_DARCY_FIXED;
    b->model->pipes[p].friction_coefficient = factor;
    b->model->pipes[p].length = length;
    return p;
}

static kent_steady *solve(kent_build *b)
{
    kent_steady *s = NULL;
    kent_error err = {0};
    kent_build_derive(b);
    if (kent_steady_solve(b->model, &s, &err) != KENT_OK) {
        fail_msg("%s: %s", err.where, err.what);
    }
    assert_string_equal(err.what, "");
    return s;
}

/* Derives, and expects the solver to refuse with a text that holds `part`. */
static void solve_fails(kent_build *b, kent_status status, const char *part)
{
    kent_steady *s = NULL;
    kent_error err = {0};
    kent_build_derive(b);
    assert_int_equal(kent_steady_solve(b->model, &s, &err), status);
    assert_null(s);
    if (!strstr(err.what, part)) fail_msg("\"%s\" lacks \"%s\"", err.what, part);
}

static double head_at(const kent_build *b, const kent_steady *s, const char *point)
{
    return s->node_head[kent_build_node_of(b, point)];
}

static double flow_in(const kent_build *b, const kent_steady *s, const char *span)
{
    return s->span_flow[kent_build_span_of(b, span)];
}

/* ---- every equation again, on its own -------------------------------------------- */

/* m3/s */
static void check_continuity(const kent_model *m, const kent_steady *s, double gap)
{
    for (size_t n = 0; n < m->node_count; n++) {
        double sum = 0.0;
        if (m->nodes[n].kind == KENT_NODE_FIXED_LEVEL) continue;
        for (size_t i = 0; i < m->span_count; i++) {
            if (m->spans[i].node[0] == (int)n) sum -= s->span_flow[i];
            if (m->spans[i].node[1] == (int)n) sum += s->span_flow[i];
        }
        for (size_t i = 0; i < m->valve_count; i++) {
            if (m->valves[i].node[0] == (int)n) sum -= s->valve_flow[i];
            if (m->valves[i].node[1] == (int)n) sum += s->valve_flow[i];
        }
        for (size_t i = 0; i < m->outflow_count; i++) {
            if (m->outflows[i].node == (int)n) sum -= s->outflow[i];
        }
        assert_within(sum, 0.0, gap);
    }
}

/* m, along spans: friction per metre from hydro, minor losses written out. */
static void check_energy(const kent_model *m, const kent_steady *s, double gap)
{
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *e = &m->spans[i];
        const double q = s->span_flow[i];
        const double v = q / area_of(e->bore);
        double slope = 0.0;
        const double loss = kent_friction_slope(&e->friction, q, &slope) * e->length +
                            e->loss * v * fabs(v) / (2.0 * m->gravity);
        assert_within(s->node_head[e->node[0]] - s->node_head[e->node[1]], loss, gap);
    }
}

static void check_levels(const kent_model *m, const kent_steady *s, double gap)
{
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        const kent_fixed_level *f = &m->fixed_levels[i];
        double out = 0.0, bore = 0.0;
        for (size_t e = 0; e < m->span_count; e++) {
            const kent_span *span = &m->spans[e];
            if (span->node[0] == f->node) out += s->span_flow[e];
            if (span->node[1] == f->node) out -= s->span_flow[e];
            if (span->node[0] == f->node || span->node[1] == f->node) {
                bore = fmax(bore, span->bore);
            }
        }
        const double v = fmax(out, 0.0) / area_of(bore);
        assert_within(s->node_head[f->node],
                      f->level - (1.0 + f->loss) * v * v / (2.0 * m->gravity), gap);
    }
}

static void check_valves(const kent_model *m, const kent_steady *s, double gap)
{
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_valve *v = &m->valves[i];
        const double q = s->valve_flow[i];
        const double e =
            s->valve_capacity[i] * kent_valve_relative_capacity(&v->curve, v->opening);
        const double after =
            v->node[1] >= 0 ? s->node_head[v->node[1]] : v->discharge_level;
        if (e > 0.0) {
            assert_within(s->node_head[v->node[0]] - after, q * fabs(q) / (e * e), gap);
        } else {
            assert_true(q == 0.0);
        }
    }
}

/* What each outflow draws at the pressure it has. gap: m of head. */
static void check_outflows(const kent_model *m, const kent_steady *s, double gap)
{
    for (size_t i = 0; i < m->outflow_count; i++) {
        const kent_outflow *o = &m->outflows[i];
        const double q = s->outflow[i];
        const double p = s->node_head[o->node] - m->points[o->point].at.z; /* m */
        if (o->flow <= 0.0) {
            assert_true(q == o->flow);
        } else if (o->pressure_dependent) {
            const double full = o->full_pressure / (m->water.density * m->gravity);
            const double share = fmin(fmax(p / full, 0.0), 1.0);
            assert_within(full * q * q / (o->flow * o->flow), full * share, gap);
        } else {
            assert_true(q >= 0.0 && q <= o->flow);
            if (q < o->flow) assert_true(p <= gap);
            if (q > 0.0) assert_true(p >= -gap);
        }
    }
}

static void check_all(const kent_model *m, const kent_steady *s)
{
    double head = 1.0, flow = 0.0;
    for (size_t n = 0; n < m->node_count; n++) {
        assert_true(isfinite(s->node_head[n]));
        head = fmax(head, fabs(s->node_head[n]));
    }
    for (size_t i = 0; i < m->span_count; i++) {
        flow = fmax(flow, fabs(s->span_flow[i]));
    }
    check_continuity(m, s, 1e-15 * fmax(flow, 1e-3));
    check_energy(m, s, 1e-13 * head);
    check_levels(m, s, 1e-13 * head);
    check_valves(m, s, 1e-13 * head);
    check_outflows(m, s, 2e-10);
    assert_int_equal(s->report.stop, KENT_STOP_CONVERGED);
    assert_true(s->report.worst_head_gap <= 1e-13 * head);
}

/* ---- closed forms ---------------------------------------------------------------- */

/* (1 + K + f L/D) V2/2g = difference of levels. */
static void two_reservoirs_share_out_their_head_in_one_pipe(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 10.0);
    add_point(&b, "S", 1500.0, 10.0);
    add_pipe(&b, "A", "R S", 0.5, 1500.0, 0.018);
    const int level = kent_build_fixed_level(&b, "R", 60.0);
    b.model->fixed_levels[level].loss = 0.5;
    kent_build_fixed_level(&b, "S", 42.0);
    kent_steady *s = solve(&b);

    const double v = sqrt(2.0 * G * 18.0 / (1.5 + 0.018 * 1500.0 / 0.5));
    assert_close(flow_in(&b, s, "A"), v * area_of(0.5), 1e-13);
    assert_close(head_at(&b, s, "R"), 60.0 - 1.5 * v * v / (2.0 * G), 1e-14);
    assert_close(head_at(&b, s, "S"), 42.0, 1e-14);
    assert_close(kent_steady_head(b.model, s, 0, 500.0),
                 (2.0 * head_at(&b, s, "R") + 42.0) / 3.0, 1e-14);
    assert_ptr_equal(s->model, b.model);
    assert_null(s->view);
    check_all(b.model, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* Against the route: the same flow with the other sign. */
static void flow_against_the_route_is_negative(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 10.0);
    add_point(&b, "S", 1500.0, 10.0);
    add_pipe(&b, "A", "S R", 0.5, 1500.0, 0.018);
    const int level = kent_build_fixed_level(&b, "R", 60.0);
    b.model->fixed_levels[level].loss = 0.5;
    kent_build_fixed_level(&b, "S", 42.0);
    kent_steady *s = solve(&b);
    const double v = sqrt(2.0 * G * 18.0 / (1.5 + 0.018 * 1500.0 / 0.5));
    assert_close(flow_in(&b, s, "A"), -v * area_of(0.5), 1e-13);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* Daugherty & Franzini, Fluid Mechanics, Ex 8.5 p 241: 5000 ft of 10 in, f 0.02, inlet
 * 0.5, 260 ft of fall: 6.40 cfs. */
static void a_long_line_passes_what_daugherty_finds(void **state)
{
    (void)state;
    const double foot = 0.3048; /* m */
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 0.0);
    add_point(&b, "S", 5000.0 * foot, 0.0);
    add_pipe(&b, "A", "R S", 10.0 / 12.0 * foot, 5000.0 * foot, 0.02);
    const int level = kent_build_fixed_level(&b, "R", 300.0 * foot);
    b.model->fixed_levels[level].loss = 0.5;
    kent_build_fixed_level(&b, "S", 40.0 * foot);
    kent_steady *s = solve(&b);
    assert_close(flow_in(&b, s, "A"), 6.40 * foot * foot * foot, 0.005);
    check_all(b.model, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* One pipe from a level at 100 m to an outflow; returns the drop of head. */
static double drop_of(kent_build *b, double flow)
{
    kent_build_fixed_level(b, "R", 100.0);
    kent_build_outflow(b, "E", flow);
    kent_steady *s = solve(b);
    const double drop = 100.0 - head_at(b, s, "E");
    check_all(b->model, s);
    kent_steady_free(s);
    return drop;
}

/* Cengel & Cimbala, Fluid Mechanics, Example 8-3 p 360: 96.5 kPa along 60 m. */
static void smooth_steel_pipe_loses_what_cengel_finds(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    b.model->water.density = 999.0;
    b.model->water.viscosity = 1.138e-3;
    add_point(&b, "R", 0.0, 0.0);
    add_point(&b, "E", 60.0, 0.0);
    const int p = add_pipe(&b, "A", "R E", 0.05, 60.0, 0.002e-3);
    b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
    const double v = 6e-3 / area_of(0.05);
    const double friction = drop_of(&b, 6e-3) - v * v / (2.0 * G); /* m */
    assert_close(999.0 * G * friction, 96.5e3, 0.005);
    kent_build_clear(&b);
}

/* Cengel & Cimbala, Fluid Mechanics, Example 8-8 p 377: z1 = 31.8 m above the outlet's
 * reservoir at 4 m. The exit's 1.06 is 1 that an outflow has left and 0.06 spread. */
static void cast_iron_line_needs_the_level_cengel_finds(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    b.model->water.density = 999.7;
    b.model->water.viscosity = 1.307e-3;
    add_point(&b, "R", 0.0, 0.0);
    add_point(&b, "E", 89.0, 0.0);
    const int p = add_pipe(&b, "A", "R E", 0.05, 89.0, 0.26e-3);
    b.model->pipes[p].friction = KENT_COLEBROOK_WHITE;
    b.model->pipes[p].loss = 0.5 + 2.0 * 0.3 + 0.2 + 0.06;
    assert_close(drop_of(&b, 6e-3) + 4.0, 31.8, 0.002);
    kent_build_clear(&b);
}

/* 10.667 L Q^1.852 / (C^1.852 d^4.8704), from memory; constants in use vary by 0.1 %.
 */
static void hazen_williams_line_loses_its_closed_form(void **state)
{
    (void)state;
    const double want[] = {6.4217, 7.0276, 3.7705};
    const double flow[] = {0.1, 0.05, 0.5}, c[] = {130.0, 100.0, 140.0};
    const double bore[] = {0.3, 0.25, 0.6};
    for (int i = 0; i < 3; i++) {
        kent_build b = kent_build_new();
        add_point(&b, "R", 0.0, 0.0);
        add_point(&b, "E", 1000.0, 0.0);
        const int p = add_pipe(&b, "A", "R E", bore[i], 1000.0, c[i]);
        b.model->pipes[p].friction = KENT_HAZEN_WILLIAMS;
        const double v = flow[i] / area_of(bore[i]);
        assert_close(drop_of(&b, flow[i]) - v * v / (2.0 * G), want[i], 0.002);
        kent_build_clear(&b);
    }
}

/* m lost between A and D by 0.25 m3/s. three: 0 the equivalent pipe, 1 three pipes one
 * after another, 2 the same side by side. */
static double equivalent_drop(int three, double bore, double length)
{
    kent_build b = kent_build_new();
    const char *ids[] = {"R", "A", "B", "C", "D"};
    for (int i = 0; i < 5; i++) {
        add_point(&b, ids[i], 100.0 * i, 0.0);
    }
    add_pipe(&b, "R1", "R A", 0.6, 100.0, 0.02);
    if (three == 0) add_pipe(&b, "E1", "A D", bore, length, 0.02);
    if (three == 1) {
        add_pipe(&b, "S1", "A B", 0.5, 1800.0, 0.02);
        add_pipe(&b, "S2", "B C", 0.4, 1200.0, 0.02);
        add_pipe(&b, "S3", "C D", 0.3, 600.0, 0.02);
    }
    if (three == 2) {
        add_pipe(&b, "P1", "A D", 0.5, 1800.0, 0.02);
        add_pipe(&b, "P2", "A D", 0.4, 1200.0, 0.02);
        add_pipe(&b, "P3", "A D", 0.3, 600.0, 0.02);
    }
    kent_build_fixed_level(&b, "R", 100.0);
    kent_build_outflow(&b, "D", 0.25);
    kent_steady *s = solve(&b);
    const double drop = head_at(&b, s, "A") - head_at(&b, s, "D");
    kent_steady_free(s);
    kent_build_clear(&b);
    return drop;
}

/* Subramanya, 1000 Solved Problems in Fluid Mechanics, Ex 11.4 p 239: 4318.2 m of
 * 400 mm for the three in series, 377.4 m of 500 mm for the three in parallel. */
static void three_pipes_equal_the_one_subramanya_finds(void **state)
{
    (void)state;
    assert_close(equivalent_drop(1, 0.0, 0.0), equivalent_drop(0, 0.4, 4318.2), 1e-3);
    assert_close(equivalent_drop(2, 0.0, 0.0), equivalent_drop(0, 0.5, 377.4), 1e-3);
}

/* ---- loops and rest -------------------------------------------------------------- */

static void a_bridge_between_equal_heads_carries_nothing(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "A", 100.0, 0.0, 0.0);
    kent_build_point(&b, "B", 300.0, 90.0, 0.0);
    kent_build_point(&b, "C", 300.0, -90.0, 0.0);
    kent_build_point(&b, "D", 500.0, 0.0, 0.0);
    const char *routes[] = {"R A", "A B", "A C", "B D", "C D", "B C"};
    const kent_friction_law laws[] = {KENT_COLEBROOK_WHITE, KENT_HAZEN_WILLIAMS,
                                      KENT_MANNING, KENT_DARCY_FIXED};
    const double coefficients[] = {1e-4, 120.0, 0.011, 0.02};
    for (int i = 0; i < 6; i++) {
        const char name[] = {(char)('p' + i), '\0'};
        add_pipe(&b, name, routes[i], i == 0 ? 0.4 : 0.3, 200.0, 0.0);
    }
    kent_build_fixed_level(&b, "R", 60.0);
    kent_build_outflow(&b, "D", 0.12);
    for (int law = 0; law < 4; law++) {
        for (int i = 0; i < 6; i++) {
            b.model->pipes[i].friction = laws[law];
            b.model->pipes[i].friction_coefficient = coefficients[law];
        }
        kent_steady *s = solve(&b);
        for (int i = 1; i < 5; i++) {
            const char name[] = {(char)('p' + i), '\0'};
            assert_close(flow_in(&b, s, name), 0.06, 1e-12);
        }
        assert_within(flow_in(&b, s, "u"), 0.0, 1e-11);
        assert_close(head_at(&b, s, "B"), head_at(&b, s, "C"), 1e-14);
        check_all(b.model, s);
        kent_steady_free(s);
    }
    kent_build_clear(&b);
}

/* In turbulent flow of one factor the two ways of a loop share the flow as
 * sqrt(D^5/L); a dead end beside it stands at its junction's head. */
static void a_loop_shares_the_flow_and_a_dead_end_has_none(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    const char *ids[] = {"R", "A", "D", "X"};
    for (int i = 0; i < 4; i++) {
        add_point(&b, ids[i], 300.0 * i, 0.0);
    }
    add_pipe(&b, "M", "R A", 0.5, 300.0, 0.02);
    add_pipe(&b, "P", "A D", 0.4, 900.0, 0.02);
    add_pipe(&b, "Q", "A D", 0.25, 500.0, 0.02);
    add_pipe(&b, "Z", "A X", 0.2, 40.0, 0.02);
    kent_build_fixed_level(&b, "R", 60.0);
    kent_build_outflow(&b, "D", 0.2);
    kent_steady *s = solve(&b);
    const double p = sqrt(pow(0.4, 5.0) / 900.0);
    const double q = sqrt(pow(0.25, 5.0) / 500.0);
    assert_close(flow_in(&b, s, "P"), 0.2 * p / (p + q), 1e-12);
    assert_close(flow_in(&b, s, "Q"), 0.2 * q / (p + q), 1e-12);
    assert_within(flow_in(&b, s, "Z"), 0.0, 1e-18);
    assert_true(fabs(head_at(&b, s, "X") - head_at(&b, s, "A")) <= 1e-14);
    check_all(b.model, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

static void nothing_moves_behind_a_closed_valve(void **state)
{
    (void)state;
    const kent_friction_law laws[] = {KENT_FRICTIONLESS, KENT_COLEBROOK_WHITE,
                                      KENT_HAZEN_WILLIAMS, KENT_MANNING,
                                      KENT_DARCY_FIXED};
    const double coefficients[] = {0.0, 1e-4, 120.0, 0.011, 0.02};
    for (int law = 0; law < 5; law++) {
        kent_build b = kent_build_new();
        const char *ids[] = {"R", "A", "B", "V"};
        for (int i = 0; i < 4; i++) {
            add_point(&b, ids[i], 300.0 * i, 0.0);
        }
        const char *routes[] = {"R A", "A B", "A B", "B V"};
        for (int i = 0; i < 4; i++) {
            const char name[] = {(char)('p' + i), '\0'};
            const int p = add_pipe(&b, name, routes[i], 0.3, 300.0, coefficients[law]);
            b.model->pipes[p].friction = laws[law];
        }
        kent_build_fixed_level(&b, "R", 75.0);
        const int valve = kent_build_valve(&b, "V1", "V", 0.2, 0.0);
        b.model->valves[valve].opening = 0.0;
        kent_steady *s = solve(&b);
        assert_true(s->valve_flow[0] == 0.0);
        assert_within(flow_in(&b, s, "p"), 0.0, 1e-15);
        for (size_t n = 0; n < b.model->node_count; n++) {
            assert_within(s->node_head[n], 75.0, 1e-13);
        }
        if (laws[law] != KENT_FRICTIONLESS) {
            assert_within(flow_in(&b, s, "q"), 0.0, 1e-11);
            assert_within(flow_in(&b, s, "r"), 0.0, 1e-11);
        }
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

static void equal_levels_leave_hazen_williams_pipes_at_rest(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    const char *ids[] = {"R", "A", "S"};
    for (int i = 0; i < 3; i++) {
        add_point(&b, ids[i], 800.0 * i, 0.0);
    }
    for (int i = 0; i < 2; i++) {
        const int p = add_pipe(&b, i ? "B" : "A", i ? "A S" : "R A", 0.4, 800.0, 110.0);
        b.model->pipes[p].friction = KENT_HAZEN_WILLIAMS;
    }
    kent_build_fixed_level(&b, "R", 75.0);
    kent_build_fixed_level(&b, "S", 75.0);
    kent_steady *s = solve(&b);
    assert_within(flow_in(&b, s, "A"), 0.0, 1e-11);
    assert_within(flow_in(&b, s, "B"), 0.0, 1e-11);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* Without friction only the velocity head is lost: V = sqrt(2 g dH). */
static void frictionless_pipes_lose_their_velocity_head_only(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 0.0);
    add_point(&b, "A", 500.0, 0.0);
    add_point(&b, "S", 900.0, 0.0);
    kent_build_pipe(&b, "A", "R A", 0.4, 1000.0);
    kent_build_pipe(&b, "B", "A S", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 20.0);
    kent_build_fixed_level(&b, "S", 19.0);
    kent_steady *s = solve(&b);
    assert_close(flow_in(&b, s, "B"), area_of(0.4) * sqrt(2.0 * G), 1e-12);
    check_all(b.model, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* ---- several levels -------------------------------------------------------------- */

/* The middle reservoir fills or empties as the junction's head stands to its level. */
static void three_reservoirs_meet_at_one_head(void **state)
{
    (void)state;
    const double middle[] = {50.0, 80.0, 95.0};
    double before = -INFINITY;
    for (int i = 0; i < 3; i++) {
        kent_build b = kent_build_new();
        kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        kent_build_point(&b, "S", 0.0, 900.0, 0.0);
        kent_build_point(&b, "T", 2000.0, 0.0, 0.0);
        kent_build_point(&b, "J", 800.0, 0.0, 0.0);
        add_pipe(&b, "A", "R J", 0.5, 900.0, 0.018);
        add_pipe(&b, "B", "S J", 0.3, 1100.0, 0.02);
        add_pipe(&b, "C", "J T", 0.4, 1300.0, 0.019);
        kent_build_fixed_level(&b, "R", 100.0);
        kent_build_fixed_level(&b, "S", middle[i]);
        kent_build_fixed_level(&b, "T", 60.0);
        kent_steady *s = solve(&b);
        check_all(b.model, s);
        const double h = head_at(&b, s, "J");
        assert_true((flow_in(&b, s, "B") > 0.0) == (middle[i] > h));
        assert_true(h > before); /* the junction rises with the reservoir */
        before = h;
        for (int n = 0; n < 4; n++) {
            assert_true(kent_static_level(b.model, n) == 100.0);
        }
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

/* Two spans at one level share its velocity head, on the larger one's area. */
static void spans_at_one_fixed_level_share_its_loss(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add_point(&b, "E", 0.0, 0.0);
    add_point(&b, "R", 500.0, 0.0);
    add_point(&b, "F", 900.0, 0.0);
    add_pipe(&b, "A", "R E", 0.3, 500.0, 0.02);
    add_pipe(&b, "B", "R F", 0.4, 400.0, 0.02);
    const int level = kent_build_fixed_level(&b, "R", 40.0);
    b.model->fixed_levels[level].loss = 0.3;
    kent_build_outflow(&b, "E", 0.05);
    kent_build_outflow(&b, "F", 0.15);
    kent_steady *s = solve(&b);
    const double v = 0.2 / area_of(0.4);
    assert_close(head_at(&b, s, "R"), 40.0 - 1.3 * v * v / (2.0 * G), 1e-14);
    kent_steady_free(s);
    kent_build_clear(&b);
}

static void the_static_level_looks_through_closed_valves_only(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    const char *ids[] = {"R", "V", "S", "P", "Q"};
    for (int i = 0; i < 5; i++) {
        kent_build_point(&b, ids[i], 100.0 * i, 0.0, 0.0);
    }
    add_pipe(&b, "A", "R V", 0.3, 100.0, 0.02);
    add_pipe(&b, "B", "V S", 0.3, 100.0, 0.02);
    add_pipe(&b, "C", "P Q", 0.3, 100.0, 0.02);
    kent_build_fixed_level(&b, "R", 90.0);
    kent_build_fixed_level(&b, "S", 70.0);
    kent_build_fixed_level(&b, "Q", 120.0); /* not connected to the others */
    const int valve = kent_build_valve(&b, "V1", "V", 0.2, NONE);
    b.model->valves[valve].opening = 0.0;
    kent_steady *s = solve(&b);
    assert_within(head_at(&b, s, "S"), 70.0, 1e-13);
    assert_true(kent_static_level(b.model, kent_build_node_of(&b, "S")) == 90.0);
    assert_true(kent_static_level(b.model, kent_build_node_of(&b, "R")) == 90.0);
    assert_true(kent_static_level(b.model, kent_build_node_of(&b, "P")) == 120.0);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* ---- valves ---------------------------------------------------------------------- */

/* A line with a valve at its end; capacity NONE: by flow. */
static kent_build valve_line(double capacity, double flow)
{
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 10.0);
    add_point(&b, "V", 1200.0, 0.0);
    add_pipe(&b, "A", "R V", 0.5, 1200.0, 0.018);
    kent_build_fixed_level(&b, "R", 50.0);
    const int v = kent_build_valve(&b, "V1", "V", capacity, 2.0);
    b.model->valves[v].flow = flow;
    return b;
}

/* 50 - 2 = (1 + f L/D) V2/2g + (Q/E)^2. */
static void a_discharging_valve_passes_its_closed_form(void **state)
{
    (void)state;
    kent_build b = valve_line(0.07, NONE);
    b.model->valves[0].opening = 0.5; /* linear: half the capacity */
    kent_steady *s = solve(&b);
    const double a = area_of(0.5);
    const double r = (1.0 + 0.018 * 1200.0 / 0.5) / (2.0 * G * a * a);
    const double e = 0.5 * 0.07;
    assert_close(s->valve_flow[0], sqrt(48.0 / (r + 1.0 / (e * e))), 1e-13);
    check_all(b.model, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

static void a_valve_given_by_flow_gets_the_capacity_that_passes_it(void **state)
{
    (void)state;
    kent_build given = valve_line(NONE, 0.3);
    given.model->valves[0].opening = 0.8;
    kent_steady *s = solve(&given);
    const double a = area_of(0.5);
    const double r = (1.0 + 0.018 * 1200.0 / 0.5) / (2.0 * G * a * a);
    const double capacity = 0.3 / sqrt(48.0 - r * 0.09) / 0.8;
    assert_true(s->valve_flow[0] == 0.3);
    assert_close(s->valve_capacity[0], capacity, 1e-13);
    check_all(given.model, s);

    kent_build back = valve_line(s->valve_capacity[0], NONE);
    back.model->valves[0].opening = 0.8;
    kent_steady *t = solve(&back);
    assert_close(t->valve_flow[0], 0.3, 1e-13);
    kent_steady_free(s);
    kent_steady_free(t);
    kent_build_clear(&given);
    kent_build_clear(&back);
}

static void a_stated_flow_that_runs_uphill_is_refused(void **state)
{
    (void)state;
    kent_build b = valve_line(NONE, 2.0);
    solve_fails(&b, KENT_E_INPUT, "valve V1 cannot pass 2 m3/s: the head would be -");
    kent_build_clear(&b);
    kent_build c = valve_line(NONE, 2.0);
    solve_fails(&c, KENT_E_INPUT, "lower its flow or its discharge_level");
    kent_build_clear(&c);
}

static void a_stated_flow_through_a_closed_valve_is_refused(void **state)
{
    (void)state;
    kent_build b = valve_line(NONE, 0.3);
    b.model->valves[0].opening = 0.0;
    solve_fails(&b, KENT_E_INPUT, "the coefficient of valve V1 cannot be found");
    kent_build_clear(&b);
}

static void a_valve_given_by_flow_fixes_no_head_behind_it(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 0.0);
    add_point(&b, "V", 100.0, 0.0);
    add_point(&b, "E", 200.0, 0.0);
    add_pipe(&b, "A", "R V", 0.3, 100.0, 0.02);
    add_pipe(&b, "B", "V E", 0.3, 100.0, 0.02);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_outflow(&b, "E", 0.1);
    const int valve = kent_build_valve(&b, "V1", "V", NONE, NONE);
    b.model->valves[valve].flow = 0.1;
    solve_fails(&b, KENT_E_INPUT,
                "only valve V1 leads there, and it is given by its flow");
    kent_build_clear(&b);
}

/* Between two reservoirs, in line, and the wrong way round for its route. */
static void an_in_line_valve_given_by_flow_may_run_against_its_route(void **state)
{
    (void)state;
    for (int sign = -1; sign <= 1; sign += 2) {
        kent_build b = kent_build_new();
        add_point(&b, "R", 0.0, 0.0);
        add_point(&b, "V", 400.0, 0.0);
        add_point(&b, "S", 900.0, 0.0);
        add_pipe(&b, "A", sign > 0 ? "R V" : "V R", 0.3, 400.0, 0.02);
        add_pipe(&b, "B", sign > 0 ? "V S" : "S V", 0.3, 500.0, 0.02);
        kent_build_fixed_level(&b, "R", 50.0);
        kent_build_fixed_level(&b, "S", 40.0);
        const int v = kent_build_valve(&b, "V1", "V", NONE, NONE);
        b.model->valves[v].flow = 0.08; /* until its sides are known */
        kent_build_derive(&b);
        const int near = kent_build_span_of(&b, "A");
        const int side = b.model->spans[near].node[sign > 0 ? 1 : 0];
        const double along = side == b.model->valves[v].node[0] ? 0.08 : -0.08;
        b.model->valves[v].flow = along;
        kent_steady *s = NULL;
        kent_error err = {0};
        assert_int_equal(kent_steady_solve(b.model, &s, &err), KENT_OK);
        assert_close(sign * s->span_flow[near], 0.08, 1e-13);
        check_all(b.model, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

/* ---- outflows -------------------------------------------------------------------- */

enum { DEPENDENT = 1, INDEPENDENT = 0 };

/* One pipe from a level of 50 m to an outflow at z m. */
static double drawn(int kind, double flow, double z)
{
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 0.0);
    add_point(&b, "E", 1000.0, z);
    add_pipe(&b, "A", "R E", 0.3, 1000.0, 0.02);
    kent_build_fixed_level(&b, "R", 50.0);
    const int o = kent_build_outflow(&b, "E", flow);
    b.model->outflows[o].pressure_dependent = kind == DEPENDENT;
    b.model->outflows[o].full_pressure = 2e5;
    kent_steady *s = solve(&b);
    const double q = s->outflow[0];
    check_all(b.model, s);
    kent_steady_free(s);
    kent_build_clear(&b);
    return q;
}

/* s2/m5 of that pipe with its entry. */
static double line_resistance(void)
{
    const double a = area_of(0.3);
    return (1.0 + 0.02 * 1000.0 / 0.3) / (2.0 * G * a * a);
}

/* q = Q sqrt(p/full) with p = 50 - z - r q2 gives q2 = (50 - z)/(r + full/Q2). */
static void a_dependent_outflow_draws_what_its_pressure_allows(void **state)
{
    (void)state;
    const double full = 2e5 / (1000.0 * G); /* m */
    const double r = line_resistance();
    assert_close(drawn(DEPENDENT, 0.2, 30.0), sqrt(20.0 / (r + full / 0.04)), 1e-12);
    assert_true(drawn(DEPENDENT, 0.05, 0.0) == 0.05);
    assert_true(drawn(DEPENDENT, 0.05, 60.0) == 0.0);
}

static void an_outflow_that_cannot_be_met_draws_down_to_zero_gauge(void **state)
{
    (void)state;
    assert_close(drawn(INDEPENDENT, 5.0, 20.0), sqrt(30.0 / line_resistance()), 1e-12);
    assert_true(drawn(INDEPENDENT, 0.05, 20.0) == 0.05);
    assert_true(drawn(INDEPENDENT, 0.05, 60.0) == 0.0);
}

static void water_pumped_in_flows_back_to_the_level(void **state)
{
    (void)state;
    assert_true(drawn(INDEPENDENT, -0.05, 60.0) == -0.05);
    assert_true(drawn(DEPENDENT, -0.05, 0.0) == -0.05);
}

/* ---- networks at random ---------------------------------------------------------- */

/* 0 .. 1, repeatable. */
static double chance(unsigned *seed)
{
    *seed = *seed * 1664525u + 1013904223u;
    return (double)(*seed >> 8) / 16777216.0;
}

static int any(unsigned *seed, int count) { return (int)(chance(seed) * count); }

static void random_pipe(kent_build *b, unsigned *seed, const char *from, const char *to)
{
    char id[24], route[48];
    (void)snprintf(id, sizeof id, "p%zu", b->model->pipe_count);
    (void)snprintf(route, sizeof route, "%s %s", from, to);
    const int p = add_pipe(b, id, route, 0.08 + 0.6 * chance(seed),
                           5.0 + 2000.0 * chance(seed), 0.02);
    kent_pipe *pipe = &b->model->pipes[p];
    const kent_friction_law laws[] = {KENT_COLEBROOK_WHITE, KENT_HAZEN_WILLIAMS,
                                      KENT_MANNING, KENT_DARCY_FIXED};
    const double coefficients[] = {2e-4, 120.0, 0.011, 0.02};
    const int law = any(seed, 4);
    pipe->friction = laws[law];
    pipe->friction_coefficient = coefficients[law];
    pipe->loss = any(seed, 3) ? 0.0 : 5.0 * chance(seed);
}

/* A valve at a point of its own; level NONE: in line. */
static void random_valve(kent_build *b, unsigned *seed, double level, double least)
{
    char id[24], at[24];
    (void)snprintf(id, sizeof id, "V%zu", b->model->valve_count);
    (void)snprintf(at, sizeof at, "v%zu", b->model->valve_count);
    const int v = kent_build_valve(b, id, at, 0.01 + 0.5 * chance(seed), level);
    b->model->valves[v].opening = fmax(least, 1.3 * chance(seed) - 0.2);
    b->model->valves[v].opening = fmin(b->model->valves[v].opening, 1.0);
}

/* A pipe, one in four with a valve in line; least: its opening. */
static void random_way(kent_build *b, unsigned *seed, int from, int to, double least)
{
    char start[24], end[24], middle[24];
    (void)snprintf(start, sizeof start, "n%d", from);
    (void)snprintf(end, sizeof end, "n%d", to);
    (void)snprintf(middle, sizeof middle, "v%zu", b->model->valve_count);
    if (any(seed, 4)) {
        random_pipe(b, seed, start, end);
        return;
    }
    kent_build_point(b, middle, 50.0 * from + 20.0, 500.0 * chance(seed), 0.0);
    random_pipe(b, seed, start, middle);
    random_pipe(b, seed, middle, end);
    random_valve(b, seed, NONE, least);
}

/* A pipe away from a point to a valve that discharges. */
static void random_outlet(kent_build *b, unsigned *seed, int from)
{
    char start[24], end[24];
    (void)snprintf(start, sizeof start, "n%d", from);
    (void)snprintf(end, sizeof end, "v%zu", b->model->valve_count);
    kent_build_point(b, end, 50.0 * from + 30.0, 500.0 * chance(seed), 0.0);
    random_pipe(b, seed, start, end);
    random_valve(b, seed, 60.0 * chance(seed), 0.0);
}

/* A tree of points with chords, which alone may have a closed valve in them. */
static kent_build random_network(unsigned *seed)
{
    kent_build b = kent_build_new();
    const int points = 4 + any(seed, 20);
    char id[16];

    for (int i = 0; i < points; i++) {
        (void)snprintf(id, sizeof id, "n%d", i);
        kent_build_point(&b, id, 50.0 * i, 500.0 * chance(seed), 40.0 * chance(seed));
    }
    for (int i = 1; i < points; i++) {
        random_way(&b, seed, i < 3 ? 0 : i - 1 - any(seed, 3), i, 0.05);
    }
    for (int i = 0; i + 3 < points; i += 2) { /* few enough legs at any point */
        random_way(&b, seed, i, i + 2 + any(seed, 2), 0.0);
        if (!any(seed, 5)) random_outlet(&b, seed, i);
    }
    for (int i = 0; i < points; i++) {
        const int what = i == 0 ? 0 : any(seed, 8);
        (void)snprintf(id, sizeof id, "n%d", i);
        if (what == 0) {
            const int f = kent_build_fixed_level(&b, id, 30.0 + 60.0 * chance(seed));
            b.model->fixed_levels[f].loss = chance(seed);
        } else if (what < 5) {
            const int o = kent_build_outflow(&b, id, 0.08 * chance(seed) - 0.005);
            b.model->outflows[o].pressure_dependent = what > 2;
            b.model->outflows[o].full_pressure = 1e5 + 2e5 * chance(seed);
        }
    }
    return b;
}

static void random_networks_satisfy_every_equation(void **state)
{
    (void)state;
    unsigned seed = 20u;
    for (int trial = 0; trial < 400; trial++) {
        kent_build b = random_network(&seed);
        kent_steady *s = solve(&b);
        check_all(b.model, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

static void the_same_network_gives_the_same_bits(void **state)
{
    (void)state;
    unsigned seed = 7u;
    kent_build b = random_network(&seed);
    kent_steady *s = solve(&b);
    kent_steady *t = NULL;
    kent_error err = {0};
    assert_int_equal(kent_steady_solve(b.model, &t, &err), KENT_OK);
    assert_memory_equal(s->node_head, t->node_head,
                        b.model->node_count * sizeof *s->node_head);
    assert_memory_equal(s->span_flow, t->span_flow,
                        b.model->span_count * sizeof *s->span_flow);
    kent_steady_free(s);
    kent_steady_free(t);
    kent_build_clear(&b);
}

enum { GRID_SIDE = 55 };

static void grid_pipe(kent_build *b, int number, int from, int to)
{
    char id[16], route[32];
    (void)snprintf(id, sizeof id, "p%d", number);
    (void)snprintf(route, sizeof route, "n%d n%d", from, to);
    const int p =
        add_pipe(b, id, route, number % 7 ? 0.2 : 0.5, 90.0 + number % 30, 1e-4);
    b->model->pipes[p].friction = KENT_COLEBROOK_WHITE;
}

static void a_grid_of_three_thousand_junctions_is_solved(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    int pipes = 0;
    char id[16];
    for (int i = 0; i < GRID_SIDE * GRID_SIDE; i++) {
        (void)snprintf(id, sizeof id, "n%d", i);
        const int row = i / GRID_SIDE;
        kent_build_point(&b, id, 100.0 * (i % GRID_SIDE), 100.0 * row,
                         5.0 * sin(0.01 * i));
    }
    for (int i = 0; i < GRID_SIDE * GRID_SIDE; i++) {
        if (i % GRID_SIDE + 1 < GRID_SIDE) grid_pipe(&b, pipes++, i, i + 1);
        if (i / GRID_SIDE + 1 < GRID_SIDE) grid_pipe(&b, pipes++, i, i + GRID_SIDE);
    }
    kent_build_fixed_level(&b, "n0", 90.0);
    kent_build_fixed_level(&b, "n3024", 85.0);
    for (int i = 5; i < GRID_SIDE * GRID_SIDE - 1; i += 5) {
        (void)snprintf(id, sizeof id, "n%d", i);
        kent_build_outflow(&b, id, 4e-4);
    }
    kent_steady *s = solve(&b);
    assert_true(b.model->node_count >= 3000);
    check_all(b.model, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* ---- failures -------------------------------------------------------------------- */

/* An inflow whose loss is beyond any number. */
static void a_failure_says_why_and_where(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 0.0);
    add_point(&b, "T1", 100.0, 0.0);
    add_pipe(&b, "A", "R T1", 0.3, 100.0, 0.02);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_outflow(&b, "T1", -1e200);
    solve_fails(&b, KENT_E_SOLVE, "no steady state was found: ");
    kent_build_clear(&b);
    kent_build c = kent_build_new();
    add_point(&c, "R", 0.0, 0.0);
    add_point(&c, "T1", 100.0, 0.0);
    add_pipe(&c, "A", "R T1", 0.3, 100.0, 0.02);
    kent_build_fixed_level(&c, "R", 50.0);
    kent_build_outflow(&c, "T1", -1e200);
    solve_fails(&c, KENT_E_SOLVE, "m3/s at point T1");
    kent_build_clear(&c);
}

static int solve_once(void *context)
{
    const kent_model *m = context;
    kent_steady *s = NULL;
    kent_error err = {0};
    const kent_status status = kent_steady_solve(m, &s, &err);
    if (status != KENT_OK) {
        if (status != KENT_E_NOMEM) fail_msg("%s", err.what);
        assert_int_equal(err.status, KENT_E_NOMEM);
        assert_null(s);
    }
    kent_steady_free(s);
    return status == KENT_OK ? 0 : -1;
}

static void any_allocation_may_fail(void **state)
{
    (void)state;
    unsigned seed = 3u;
    kent_build b = random_network(&seed);
    kent_build_derive(&b);
    assert_true(kent_allocations_needed(solve_once, b.model) > 20);
    kent_build_clear(&b);
}

static void a_model_without_a_network_has_an_empty_steady_state(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_steady *s = solve(&b);
    assert_int_equal(s->report.stop, KENT_STOP_CONVERGED);
    assert_int_equal(s->report.worst_node, -1);
    kent_steady_free(s);
    kent_steady_free(NULL);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(two_reservoirs_share_out_their_head_in_one_pipe),
        cmocka_unit_test(flow_against_the_route_is_negative),
        cmocka_unit_test(a_long_line_passes_what_daugherty_finds),
        cmocka_unit_test(smooth_steel_pipe_loses_what_cengel_finds),
        cmocka_unit_test(cast_iron_line_needs_the_level_cengel_finds),
        cmocka_unit_test(hazen_williams_line_loses_its_closed_form),
        cmocka_unit_test(three_pipes_equal_the_one_subramanya_finds),
        cmocka_unit_test(a_bridge_between_equal_heads_carries_nothing),
        cmocka_unit_test(a_loop_shares_the_flow_and_a_dead_end_has_none),
        cmocka_unit_test(nothing_moves_behind_a_closed_valve),
        cmocka_unit_test(equal_levels_leave_hazen_williams_pipes_at_rest),
        cmocka_unit_test(frictionless_pipes_lose_their_velocity_head_only),
        cmocka_unit_test(three_reservoirs_meet_at_one_head),
        cmocka_unit_test(spans_at_one_fixed_level_share_its_loss),
        cmocka_unit_test(the_static_level_looks_through_closed_valves_only),
        cmocka_unit_test(a_discharging_valve_passes_its_closed_form),
        cmocka_unit_test(a_valve_given_by_flow_gets_the_capacity_that_passes_it),
        cmocka_unit_test(a_stated_flow_that_runs_uphill_is_refused),
        cmocka_unit_test(a_stated_flow_through_a_closed_valve_is_refused),
        cmocka_unit_test(a_valve_given_by_flow_fixes_no_head_behind_it),
        cmocka_unit_test(an_in_line_valve_given_by_flow_may_run_against_its_route),
        cmocka_unit_test(a_dependent_outflow_draws_what_its_pressure_allows),
        cmocka_unit_test(an_outflow_that_cannot_be_met_draws_down_to_zero_gauge),
        cmocka_unit_test(water_pumped_in_flows_back_to_the_level),
        cmocka_unit_test(random_networks_satisfy_every_equation),
        cmocka_unit_test(the_same_network_gives_the_same_bits),
        cmocka_unit_test(a_grid_of_three_thousand_junctions_is_solved),
        cmocka_unit_test(a_failure_says_why_and_where),
        cmocka_unit_test(any_allocation_may_fail),
        cmocka_unit_test(a_model_without_a_network_has_an_empty_steady_state),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
