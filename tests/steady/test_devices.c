#include "kent_build.h"
#include "kent_check.h"
#include "kent_steady.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static const double NONE = (double)NAN;
static const double G = 9.80665; /* m/s2, of kent_build's models */
static const double PI = 3.14159265358979323846;
static const double WEIGHT = 9806.65; /* N/m3, of their water */

static double area_of(double bore) { return PI * bore * bore / 4.0; }

/* s2/m5 of a pipe with a fixed Darcy factor. */
static double resistance(double bore, double length, double factor)
{
    const double a = area_of(bore);
    return factor * length / bore / (2.0 * G * a * a);
}

static void add_point(kent_build *b, const char *id, double x, double z)
{
    kent_build_point(b, id, x, 0.0, z);
}

static int add_pipe(kent_build *b, const char *id, const char *route, double bore,
                    double length)
{
    const int p = kent_build_pipe(b, id, route, bore, 1000.0);
    b->model->pipes[p].friction = KENT_DARCY_FIXED;
    b->model->pipes[p].friction_coefficient = 0.02;
    b->model->pipes[p].length = length;
    return p;
}

/* A pump whose curve has two points, which is a parabola: lift = top - fall q2. */
static int add_pump(kent_build *b, const char *id, const char *at, const char *flow_to,
                    double top, double fall)
{
    const double rated = sqrt(0.3 * top / fall); /* m3/s */
    const int p = kent_build_pump(b, id, at, flow_to, top, rated, 0.7 * top);
    kent_pump_curve *c = &b->model->pumps[p].curve;
    c->count = 2;
    c->flow[1] = sqrt(0.95 * top / fall);
    c->head[1] = 0.05 * top;
    assert_null(kent_pump_curve_complete(c, 1000.0, G));
    assert_within(kent_pump_at(c, rated, c->rated_speed).head, 0.7 * top, 1e-9);
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
    return s;
}

/* Solves and expects a refusal that holds a text, at a line of "built.cfg". */
static void refused(kent_build *b, const char *text, int line)
{
    kent_steady *s = NULL;
    kent_error err = {0};
    char where[40];
    kent_build_derive(b);
    (void)snprintf(where, sizeof where, "built.cfg:%d", line);
    assert_int_equal(kent_steady_solve(b->model, &s, &err), KENT_E_INPUT);
    assert_null(s);
    assert_string_equal(err.where, where);
    if (!strstr(err.what, text)) fail_msg("\"%s\" lacks \"%s\"", err.what, text);
    kent_build_clear(b);
}

static double flow_of(const kent_build *b, const kent_steady *s, const char *device)
{
    const int i = kent_model_device_index(b->model, device);
    assert_true(i >= 0);
    return s->device_flow[i];
}

/* m at one side of a device. */
static double head_of(const kent_build *b, const kent_steady *s, const char *device,
                      int side)
{
    return s->node_head[b->model->devices[kent_model_device_index(b->model, device)]
                            .node[side]];
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
        for (size_t i = 0; i < m->outflow_count; i++) {
            if (m->outflows[i].node == (int)n) sum -= s->outflow[i];
        }
        for (size_t i = 0; i < m->device_count; i++) {
            if (m->devices[i].node[0] == (int)n) sum -= s->device_flow[i];
            if (m->devices[i].node[1] == (int)n) sum += s->device_flow[i];
        }
        assert_within(sum, 0.0, gap);
    }
}

static void check_energy(const kent_model *m, const kent_steady *s, double gap)
{
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *e = &m->spans[i];
        double slope = 0.0;
        assert_within(s->node_head[e->node[0]] - s->node_head[e->node[1]],
                      kent_friction_slope(&e->friction, s->span_flow[i], &slope) *
                          e->length,
                      gap);
    }
}

static void check_pump(const kent_pump *p, double q, double lift, double gap)
{
    if (p->running == 0 && p->check_valve != KENT_CHECK_NONE) {
        assert_true(q == 0.0);
        return;
    }
    const double of_one = q / (p->running > 0 ? p->running : p->in_parallel);
    const double speed = p->running > 0 ? p->curve.rated_speed : 0.0;
    const double found = kent_pump_at(&p->curve, of_one, speed).head -
                         (p->running > 0 ? p->check_loss * of_one * of_one : 0.0);
    if (p->check_valve != KENT_CHECK_NONE) assert_true(q >= 0.0);
    if (q == 0.0 && p->check_valve != KENT_CHECK_NONE) {
        assert_true(lift >= found - gap); /* it holds back what is more */
    } else {
        assert_within(lift, found, gap);
    }
}

/* fall: m from before to behind it. */
static void check_check_valve(const kent_check_valve *v, double q, double fall,
                              double gap)
{
    const double a = area_of(v->size);
    assert_true(q >= 0.0);
    if (q > 0.0) assert_within(fall, v->loss * q * q / (2.0 * G * a * a), gap);
    if (q == 0.0) assert_true(fall <= gap);
}

/* before, behind: m of head there above the point. */
static void check_control_valve(const kent_control_valve *v, double q, double before,
                                double behind, double gap)
{
    const double set = v->set_pressure / WEIGHT; /* m */
    const bool reduces = v->holds == KENT_HOLDS_DOWNSTREAM;
    const double off = reduces ? behind - set : set - before; /* m beyond what is set */
    const double open = q * q / (v->capacity * v->capacity);
    assert_true(q >= 0.0);
    if (q > 0.0) {
        assert_true(off <= gap);
        assert_true(before - behind >= open - gap);
        if (off < -gap) assert_within(before - behind, open, gap);
    } else if (off < -gap) {
        assert_true(before - behind <= gap);
    }
}

/* The opening rises in proportion from set to full opening pressure. */
static void check_relief_valve(const kent_model *m, const kent_relief_valve *r,
                               double q, double head)
{
    const double above = (head - m->points[r->point].at.z) * WEIGHT; /* Pa */
    const double share =
        fmin(fmax((above - r->set_pressure) / (r->full_open_pressure - r->set_pressure),
                  0.0),
             1.0);
    assert_within(q, r->capacity * share * sqrt(fmax(head - r->discharge_level, 0.0)),
                  1e-9);
}

static void check_devices(const kent_model *m, const kent_steady *s, double gap)
{
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        const double q = s->device_flow[i];
        const double behind = d->node[1] >= 0 ? s->node_head[d->node[1]] : NONE;
        const double before = d->node[0] >= 0 ? s->node_head[d->node[0]]
                                              : m->pumps[d->index].suction_level;
        const double z = m->points[d->point].at.z;
        switch (d->kind) {
        case KENT_DEVICE_PUMP:
            check_pump(&m->pumps[d->index], q, behind - before, gap);
            break;
        case KENT_DEVICE_CHECK_VALVE:
            check_check_valve(&m->check_valves[d->index], q, before - behind, gap);
            break;
        case KENT_DEVICE_CONTROL_VALVE:
            check_control_valve(&m->control_valves[d->index], q, before - z, behind - z,
                                gap);
            break;
        case KENT_DEVICE_RELIEF_VALVE:
            check_relief_valve(m, &m->relief_valves[d->index], q, before);
            break;
        case KENT_DEVICE_SURGE_TANK:
        case KENT_DEVICE_ONE_WAY_TANK:
        case KENT_DEVICE_AIR_VESSEL:
        case KENT_DEVICE_AIR_VALVE:
        case KENT_DEVICE_BURST:
            assert_true(q == 0.0);
            break;
        case KENT_DEVICE_KINDS:
            fail();
        }
    }
}

static void check_outflows(const kent_model *m, const kent_steady *s, double gap)
{
    for (size_t i = 0; i < m->outflow_count; i++) {
        const kent_outflow *o = &m->outflows[i];
        const double q = s->outflow[i];
        const double p = s->node_head[o->node] - m->points[o->point].at.z; /* m */
        if (o->flow <= 0.0) {
            assert_true(q == o->flow);
        } else if (o->pressure_dependent) {
            const double full = o->full_pressure / WEIGHT;
            assert_within(full * q * q / (o->flow * o->flow),
                          full * fmin(fmax(p / full, 0.0), 1.0), gap);
        } else {
            assert_true(q >= -1e-12 && q <= o->flow + 1e-12);
            if (q < o->flow) assert_true(p <= gap);
            if (q > 0.0) assert_true(p >= -gap);
        }
    }
}

static void check_all(const kent_build *b, const kent_steady *s)
{
    const kent_model *m = b->model;
    double head = 1.0, flow = 0.1;
    for (size_t n = 0; n < m->node_count; n++) {
        assert_true(isfinite(s->node_head[n]));
        head = fmax(head, fabs(s->node_head[n]));
    }
    for (size_t i = 0; i < m->span_count; i++) {
        flow = fmax(flow, fabs(s->span_flow[i]));
    }
    check_continuity(m, s, 2e-12 * flow);
    check_energy(m, s, 1e-12 * head);
    check_devices(m, s, 2e-10);
    check_outflows(m, s, 2e-10);
    assert_int_equal(s->report.stop, KENT_STOP_CONVERGED);
}

/* ---- pumps ----------------------------------------------------------------------- */

/* A station that draws from 10 m and delivers through 2 km of 300 mm to `level`. */
static kent_build rising_main(double level)
{
    kent_build b = kent_build_new();
    add_point(&b, "P", 0.0, 8.0);
    add_point(&b, "R", 2000.0, 30.0);
    add_pipe(&b, "A", "P R", 0.3, 2000.0);
    const int p = add_pump(&b, "PS", "P", NULL, 60.0, 4000.0);
    b.model->pumps[p].suction_level = 10.0;
    kent_build_fixed_level(&b, "R", level);
    return b;
}

/* 10 + 60 - 4000 (q/n)2 - c (q/n)2 = 40 + r q2. */
static void a_station_delivers_where_its_curve_meets_the_main(void **state)
{
    (void)state;
    for (int n = 1; n <= 3; n++) {
        kent_build b = rising_main(40.0);
        kent_pump *p = &b.model->pumps[0];
        p->in_parallel = 3;
        p->running = n;
        p->check_valve = KENT_CHECK_IDEAL;
        p->check_loss = 500.0;
        kent_steady *s = solve(&b);
        const double r = resistance(0.3, 2000.0, 0.02);
        const double q = sqrt(30.0 / (r + 4500.0 / (n * n)));
        assert_close(flow_of(&b, s, "PS"), q, 1e-12);
        assert_close(head_of(&b, s, "PS", 1), 40.0 + r * q * q, 1e-12);
        check_all(&b, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

/* Munson, Young and Okiishi, Fundamentals of Fluid Mechanics, Example 12.4, from
 * memory: 200 ft of 6 in, f = 0.02, K = 0.5 + 1.5 + 1.0, 10 ft of lift; the pump's
 * curve is met at 1600 gal/min and 66.5 ft with an efficiency of 84 %, which takes 32.0
 * hp. Of the curve that point alone is theirs. */
static void pump_and_system_meet_where_munson_finds_it(void **state)
{
    (void)state;
    const double foot = 0.3048, gallon = 3.785411784e-3; /* m, m3 */
    const double q = 1600.0 * gallon / 60.0;
    kent_build b = kent_build_new();
    add_point(&b, "P", 0.0, 0.0);
    add_point(&b, "R", 200.0 * foot, 0.0);
    const int pipe = add_pipe(&b, "A", "P R", 0.5 * foot, 200.0 * foot);
    b.model->pipes[pipe].loss = 3.0;
    kent_build_fixed_level(&b, "R", 15.0 * foot);
    const int p = kent_build_pump(&b, "PS", "P", NULL, 88.0 * foot, q, 66.5 * foot);
    kent_pump *pump = &b.model->pumps[p];
    pump->suction_level = 5.0 * foot;
    pump->curve.rated_efficiency = 0.84;
    assert_null(kent_pump_curve_complete(&pump->curve, 1000.0, G));
    kent_steady *s = solve(&b);
    const kent_pump_duty duty = kent_steady_pump(s, 0);
    assert_close(duty.flow, q, 5e-3);
    assert_close(duty.lift, 66.5 * foot, 5e-3);
    assert_close(duty.power, 32.0 * 745.7, 5e-3);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* One of two runs and part of its water runs back through the other: its duty is that
 * of the one, by its own curve, and the water that both pass is what the main takes. */
static void the_duty_of_one_beside_a_standing_one_is_its_own(void **state)
{
    (void)state;
    kent_build b = rising_main(30.0);
    kent_pump *pump = &b.model->pumps[0];
    pump->in_parallel = 2;
    pump->running = 1;
    kent_steady *s = solve(&b);
    const kent_pump_curve *c = &pump->curve;
    const kent_pump_duty duty = kent_steady_pump(s, 0);
    const kent_pump_point one = kent_pump_at(c, duty.of_one, c->rated_speed);
    assert_within(one.head, duty.lift, 1e-9);
    assert_within(duty.power, one.torque * c->rated_speed, 1e-9 * duty.power);
    assert_true(duty.of_one > 1.01 * duty.flow);
    assert_within(kent_pump_at(c, duty.flow - duty.of_one, 0.0).head, duty.lift, 1e-9);
    kent_steady_free(s);
    kent_build_clear(&b);
}

static void a_pump_too_weak_for_the_lift_is_held_by_its_check_valve(void **state)
{
    (void)state;
    kent_build b = rising_main(75.0);
    b.model->pumps[0].check_valve = KENT_CHECK_IDEAL;
    kent_steady *s = solve(&b);
    assert_true(flow_of(&b, s, "PS") == 0.0);
    assert_within(head_of(&b, s, "PS", 1), 75.0, 1e-12);
    check_all(&b, s);
    kent_steady_free(s);
    kent_build_clear(&b);
    kent_build c = rising_main(75.0);
    refused(&c, "pump PS cannot deliver: it lifts 60.00 m at no flow", 700);
}

static void a_standing_pump_lets_water_back_only_without_a_check_valve(void **state)
{
    (void)state;
    kent_build b = rising_main(40.0);
    b.model->pumps[0].running = 0;
    b.model->pumps[0].check_valve = KENT_CHECK_DELAYED;
    b.model->pumps[0].check_delay = 1.0;
    kent_steady *s = solve(&b);
    assert_true(flow_of(&b, s, "PS") == 0.0);
    check_all(&b, s);
    kent_steady_free(s);
    kent_build_clear(&b);

    kent_build c = rising_main(40.0);
    c.model->pumps[0].running = 0;
    c.model->pumps[0].in_parallel = 2;
    kent_steady *t = solve(&c);
    assert_true(flow_of(&c, t, "PS") < -0.01);
    check_all(&c, t);
    kent_steady_free(t);
    kent_build_clear(&c);
}

/* Two stations one after another, the second in line: lifts add up. And one in line
 * against its flow_to. */
static void boosters_in_series_add_their_lifts(void **state)
{
    (void)state;
    for (int sign = -1; sign <= 1; sign += 2) {
        kent_build b = kent_build_new();
        add_point(&b, "P", 0.0, 8.0);
        add_point(&b, "B", 1000.0, 8.0);
        add_point(&b, "R", 2000.0, 30.0);
        add_pipe(&b, "A", "P B", 0.3, 1000.0);
        add_pipe(&b, "C", sign > 0 ? "B R" : "R B", 0.3, 1000.0);
        const int p = add_pump(&b, "P1", "P", NULL, 50.0, 3000.0);
        b.model->pumps[p].suction_level = 10.0;
        add_pump(&b, "P2", "B", "R", 35.0, 2000.0);
        kent_build_fixed_level(&b, "R", 80.0);
        kent_steady *s = solve(&b);
        const double r = resistance(0.3, 2000.0, 0.02);
        assert_close(flow_of(&b, s, "P1"), sqrt(15.0 / (r + 5000.0)), 1e-12);
        assert_close(flow_of(&b, s, "P2"), sqrt(15.0 / (r + 5000.0)), 1e-12);
        check_all(&b, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

/* The weaker of two stations on one main is shut out, or helps, as the main asks. */
static void the_weaker_of_two_stations_is_shut_out(void **state)
{
    (void)state;
    for (int helps = 0; helps <= 1; helps++) {
        kent_build b = kent_build_new();
        add_point(&b, "P", 0.0, 8.0);
        add_point(&b, "Q", 0.0, 8.0);
        add_point(&b, "J", 100.0, 8.0);
        add_point(&b, "R", 2000.0, 30.0);
        add_pipe(&b, "A", "P J", 0.3, 100.0);
        add_pipe(&b, "B", "Q J", 0.3, 100.0);
        add_pipe(&b, "C", "J R", 0.3, 1900.0);
        const char *ids[] = {"P1", "P2"};
        const double top[] = {60.0, helps ? 57.0 : 42.0};
        for (int i = 0; i < 2; i++) {
            const int p = add_pump(&b, ids[i], i ? "Q" : "P", NULL, top[i], 2000.0);
            b.model->pumps[p].suction_level = 10.0;
            b.model->pumps[p].check_valve = KENT_CHECK_IDEAL;
        }
        kent_build_fixed_level(&b, "R", 45.0);
        kent_steady *s = solve(&b);
        assert_true((flow_of(&b, s, "P2") > 0.0) == (helps == 1));
        if (!helps) {
            const double r = resistance(0.3, 2000.0, 0.02);
            assert_close(flow_of(&b, s, "P1"), sqrt(25.0 / (r + 2000.0)), 1e-12);
        }
        check_all(&b, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

/* A booster with a bypass and a check valve in it: the bypass takes over where the
 * booster stands or the level suffices. */
static kent_build bypassed_booster(double level, int running)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 8.0);
    kent_build_point(&b, "S", 500.0, 0.0, 8.0);
    kent_build_point(&b, "B", 510.0, 10.0, 8.0);
    kent_build_point(&b, "N", 510.0, -10.0, 8.0);
    kent_build_point(&b, "D", 520.0, 0.0, 8.0);
    kent_build_point(&b, "T", 1500.0, 0.0, 8.0);
    add_pipe(&b, "A", "R S", 0.3, 500.0);
    add_pipe(&b, "B1", "S B", 0.3, 10.0);
    add_pipe(&b, "B2", "B D", 0.3, 10.0);
    add_pipe(&b, "N1", "S N", 0.3, 10.0);
    add_pipe(&b, "N2", "N D", 0.3, 10.0);
    add_pipe(&b, "C", "D T", 0.3, 1000.0);
    const int p = add_pump(&b, "BP", "B", "D", 30.0, 3000.0);
    b.model->pumps[p].running = running;
    b.model->pumps[p].check_valve = KENT_CHECK_IDEAL;
    kent_build_check_valve(&b, "NR", "N", "D");
    kent_build_fixed_level(&b, "R", level);
    kent_build_fixed_level(&b, "T", 45.0);
    return b;
}

static void a_bypass_passes_only_what_the_booster_does_not(void **state)
{
    (void)state;
    kent_build b = bypassed_booster(50.0, 1);
    kent_steady *s = solve(&b);
    assert_true(flow_of(&b, s, "BP") > 0.0 && flow_of(&b, s, "NR") == 0.0);
    check_all(&b, s);
    kent_steady_free(s);
    kent_build_clear(&b);
    kent_build c = bypassed_booster(50.0, 0);
    kent_steady *t = solve(&c);
    assert_true(flow_of(&c, t, "BP") == 0.0 && flow_of(&c, t, "NR") > 0.0);
    check_all(&c, t);
    kent_steady_free(t);
    kent_build_clear(&c);
    kent_build d = bypassed_booster(40.0, 0);
    kent_steady *u = solve(&d);
    assert_true(flow_of(&d, u, "BP") == 0.0 && flow_of(&d, u, "NR") == 0.0);
    check_all(&d, u);
    kent_steady_free(u);
    kent_build_clear(&d);
}

/* A curve that is all but flat, and one that falls to nothing in no time. */
static void flat_and_steep_curves_are_met_as_well(void **state)
{
    (void)state;
    const double fall[] = {1e-3, 1.0, 1e6};
    for (int i = 0; i < 3; i++) {
        kent_build b = rising_main(40.0);
        b.model->pump_count = 0;
        const int p = add_pump(&b, "PS", "P", NULL, 60.0, fall[i]);
        b.model->pumps[p].suction_level = 10.0;
        kent_steady *s = solve(&b);
        const double r = resistance(0.3, 2000.0, 0.02);
        assert_close(flow_of(&b, s, "PS"), sqrt(30.0 / (r + fall[i])), 1e-12);
        check_all(&b, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

/* Pumping against a closed valve: no flow, and the head that the pump then holds. */
static void a_pump_behind_a_closed_valve_holds_its_head_at_no_flow(void **state)
{
    (void)state;
    for (int check = 0; check <= 1; check++) {
        kent_build b = kent_build_new();
        add_point(&b, "P", 0.0, 8.0);
        add_point(&b, "V", 1000.0, 8.0);
        add_point(&b, "R", 2000.0, 30.0);
        add_pipe(&b, "A", "P V", 0.3, 1000.0);
        add_pipe(&b, "C", "V R", 0.3, 1000.0);
        const int p = add_pump(&b, "PS", "P", NULL, 60.0, 3000.0);
        b.model->pumps[p].suction_level = 10.0;
        if (check) b.model->pumps[p].check_valve = KENT_CHECK_IDEAL;
        kent_build_fixed_level(&b, "R", 90.0);
        const int v = kent_build_valve(&b, "V1", "V", 0.1, NONE);
        b.model->valves[v].opening = 0.0;
        kent_steady *s = solve(&b);
        assert_within(flow_of(&b, s, "PS"), 0.0, 1e-13);
        assert_within(head_of(&b, s, "PS", 1), 70.0, 1e-12);
        check_all(&b, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

/* ---- check valves ---------------------------------------------------------------- */

/* R -> K1 -> K2 -> S along one line. */
static kent_build two_check_valves(double level_r, double level_s)
{
    kent_build b = kent_build_new();
    const char *ids[] = {"R", "K1", "K2", "S"};
    for (int i = 0; i < 4; i++) {
        add_point(&b, ids[i], 500.0 * i, 5.0);
    }
    add_pipe(&b, "A", "R K1", 0.3, 500.0);
    add_pipe(&b, "B", "K1 K2", 0.3, 500.0);
    add_pipe(&b, "C", "K2 S", 0.3, 500.0);
    kent_build_check_valve(&b, "N1", "K1", "K2");
    kent_build_check_valve(&b, "N2", "K2", "S");
    kent_build_fixed_level(&b, "R", level_r);
    kent_build_fixed_level(&b, "S", level_s);
    return b;
}

static void check_valves_pass_forward_and_nothing_back(void **state)
{
    (void)state;
    kent_build b = two_check_valves(60.0, 50.0);
    kent_steady *s = solve(&b);
    const double a = area_of(0.3);
    const double r =
        resistance(0.3, 1500.0, 0.02) + (1.0 + 2.0) / (2.0 * G * a * a); /* entry too */
    assert_close(flow_of(&b, s, "N1"), sqrt(10.0 / r), 1e-12);
    check_all(&b, s);
    kent_steady_free(s);
    kent_build_clear(&b);
    /* back: both shut, and the water between them is held by the one that feeds it */
    kent_build c = two_check_valves(50.0, 60.0);
    kent_steady *t = solve(&c);
    assert_true(flow_of(&c, t, "N1") == 0.0 && flow_of(&c, t, "N2") == 0.0);
    assert_within(head_of(&c, t, "N2", 0), 50.0, 1e-12);
    assert_within(head_of(&c, t, "N2", 1), 60.0, 1e-12);
    check_all(&c, t);
    kent_steady_free(t);
    kent_build_clear(&c);
    kent_build d = two_check_valves(55.0, 55.0);
    kent_steady *u = solve(&d);
    check_all(&d, u);
    assert_within(flow_of(&d, u, "N2"), 0.0, 1e-9);
    kent_steady_free(u);
    kent_build_clear(&d);
}

/* What is pumped in behind a check valve has no way out. */
static void water_that_cannot_leave_is_refused(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 5.0);
    add_point(&b, "K", 500.0, 5.0);
    add_point(&b, "E", 900.0, 5.0);
    add_pipe(&b, "A", "R K", 0.3, 500.0);
    add_pipe(&b, "B", "K E", 0.3, 400.0);
    kent_build_check_valve(&b, "NR", "K", "E");
    kent_build_fixed_level(&b, "R", 60.0);
    kent_build_outflow(&b, "E", -0.02);
    refused(&b, "only check valve NR leads there, and it lets nothing back", 700);
}

/* ---- control valves -------------------------------------------------------------- */

/* R -> V -> E: level, a control valve at z = 5, then whatever is at E. */
static kent_build zone(double level, kent_holds holds, double set_head)
{
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 5.0);
    add_point(&b, "V", 500.0, 5.0);
    add_point(&b, "E", 1000.0, 2.0);
    add_pipe(&b, "A", "R V", 0.3, 500.0);
    add_pipe(&b, "B", "V E", 0.3, 500.0);
    kent_build_control_valve(&b, "CV", "V", "E", holds, WEIGHT * set_head);
    kent_build_fixed_level(&b, "R", level);
    return b;
}

static void a_reducing_valve_holds_what_it_is_set_to(void **state)
{
    (void)state;
    kent_build b = zone(80.0, KENT_HOLDS_DOWNSTREAM, 30.0);
    kent_build_outflow(&b, "E", 0.05);
    kent_steady *s = solve(&b);
    assert_within(head_of(&b, s, "CV", 1), 35.0, 1e-12);
    assert_true(s->outflow[0] == 0.05);
    check_all(&b, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

static void a_dead_end_behind_a_reducing_valve_is_at_its_set_pressure(void **state)
{
    (void)state;
    kent_build b = zone(80.0, KENT_HOLDS_DOWNSTREAM, 30.0);
    kent_steady *s = solve(&b);
    assert_within(flow_of(&b, s, "CV"), 0.0, 1e-13);
    assert_within(head_of(&b, s, "CV", 1), 35.0, 1e-12);
    check_all(&b, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* Set higher than what arrives: open, with the loss of its full opening. */
static void a_reducing_valve_that_cannot_hold_stands_open(void **state)
{
    (void)state;
    kent_build b = zone(30.0, KENT_HOLDS_DOWNSTREAM, 40.0);
    kent_build_outflow(&b, "E", 0.05);
    kent_steady *s = solve(&b);
    assert_within(head_of(&b, s, "CV", 0) - head_of(&b, s, "CV", 1), 0.25, 1e-12);
    check_all(&b, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

/* A level beyond it that stands higher than it is set, and one even above the source.
 */
static void a_reducing_valve_shuts_against_what_is_higher(void **state)
{
    (void)state;
    const double beyond[] = {40.0, 90.0};
    for (int i = 0; i < 2; i++) {
        kent_build b = zone(80.0, KENT_HOLDS_DOWNSTREAM, 30.0);
        kent_build_fixed_level(&b, "E", beyond[i]);
        kent_steady *s = solve(&b);
        assert_true(flow_of(&b, s, "CV") == 0.0);
        check_all(&b, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

static void a_sustaining_valve_holds_the_head_before_it(void **state)
{
    (void)state;
    /* throttles: the flow is what the first pipe brings down to 45 m */
    kent_build b = zone(50.0, KENT_HOLDS_UPSTREAM, 40.0);
    kent_build_fixed_level(&b, "E", 10.0);
    kent_steady *s = solve(&b);
    const double a = area_of(0.3);
    const double r = resistance(0.3, 500.0, 0.02) + 1.0 / (2.0 * G * a * a);
    assert_close(flow_of(&b, s, "CV"), sqrt(5.0 / r), 1e-12);
    check_all(&b, s);
    kent_steady_free(s);
    kent_build_clear(&b);
    /* cannot hold it: shut */
    kent_build c = zone(40.0, KENT_HOLDS_UPSTREAM, 40.0);
    kent_build_fixed_level(&c, "E", 10.0);
    kent_steady *t = solve(&c);
    assert_true(flow_of(&c, t, "CV") == 0.0);
    check_all(&c, t);
    kent_steady_free(t);
    kent_build_clear(&c);
    /* has more than enough: open */
    kent_build d = zone(60.0, KENT_HOLDS_UPSTREAM, 40.0);
    kent_build_fixed_level(&d, "E", 55.0);
    kent_steady *u = solve(&d);
    assert_true(flow_of(&d, u, "CV") > 0.0 && head_of(&d, u, "CV", 0) > 45.0);
    check_all(&d, u);
    kent_steady_free(u);
    kent_build_clear(&d);
}

/* Behind a valve that sustains, an outflow gets what is left. */
static void an_outflow_behind_a_sustaining_valve_gets_the_rest(void **state)
{
    (void)state;
    for (int dependent = 0; dependent <= 1; dependent++) {
        kent_build b = zone(50.0, KENT_HOLDS_UPSTREAM, 40.0);
        const int o = kent_build_outflow(&b, "E", 0.5);
        b.model->outflows[o].pressure_dependent = dependent == 1;
        b.model->outflows[o].full_pressure = 3e5;
        kent_steady *s = solve(&b);
        assert_within(head_of(&b, s, "CV", 0), 45.0, 1e-11);
        assert_true(s->outflow[0] < 0.5);
        check_all(&b, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

/* ---- what stands beside the main ------------------------------------------------- */

static void a_relief_valve_opens_as_the_pressure_rises(void **state)
{
    (void)state;
    const double set[] = {60.0, 45.0, 20.0}; /* m: shut, partly open, fully open */
    for (int i = 0; i < 3; i++) {
        kent_build b = rising_main(40.0);
        kent_build_relief_valve(&b, "RV", "R", WEIGHT * set[i], 0.001);
        b.model->relief_valves[0].point = kent_model_point_index(b.model, "P");
        b.model->fixed_levels[0].level = 55.0;
        b.model->relief_valves[0].discharge_level = 9.0;
        kent_steady *s = solve(&b);
        assert_true((flow_of(&b, s, "RV") > 0.0) == (i > 0));
        check_all(&b, s);
        kent_steady_free(s);
        kent_build_clear(&b);
    }
}

/* A main at 50 m at its middle, M, at z = 20. */
static kent_build with_middle(void)
{
    kent_build b = kent_build_new();
    add_point(&b, "R", 0.0, 20.0);
    add_point(&b, "M", 500.0, 20.0);
    add_point(&b, "S", 1000.0, 20.0);
    add_pipe(&b, "A", "R M", 0.3, 500.0);
    add_pipe(&b, "B", "M S", 0.3, 500.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_fixed_level(&b, "S", 50.0);
    return b;
}

static void vessels_and_tanks_rest_where_the_head_suits_them(void **state)
{
    (void)state;
    kent_build b = with_middle();
    kent_build_surge_tank(&b, "ST", "M", 20.0);
    b.model->surge_tanks[0].overflow_level = 50.0;
    kent_build_one_way_tank(&b, "FT", "R", 10.0, 45.0);
    b.model->one_way_tanks[0].point = kent_model_point_index(b.model, "M");
    kent_build_air_vessel(&b, "AV", "M", 10.0, 4.0);
    kent_build_air_valve(&b, "A1", "M", 0.1, 0.01);
    kent_steady *s = solve(&b);
    check_all(&b, s);
    kent_steady_free(s);
    kent_build_clear(&b);
}

static void tanks_that_would_not_rest_are_refused(void **state)
{
    (void)state;
    kent_build b = with_middle();
    kent_build_surge_tank(&b, "ST", "M", 20.0);
    b.model->surge_tanks[0].overflow_level = 49.0;
    refused(&b,
            "surge tank ST would overflow in the steady state: the head there is "
            "50.000 m, its overflow_level 49.000 m",
            700);
    kent_build c = with_middle();
    kent_build_surge_tank(&c, "ST", "M", 20.0);
    c.model->surge_tanks[0].bottom_level = 51.0;
    refused(&c, "surge tank ST would be empty in the steady state", 700);
    kent_build d = with_middle();
    kent_build_one_way_tank(&d, "FT", "M", 10.0, 52.0);
    refused(&d, "one-way surge tank FT would run empty in the steady state", 700);
    kent_build e = with_middle();
    kent_build_air_valve(&e, "A1", "M", 0.1, 0.01);
    e.model->points[1].at.z = 51.0;
    refused(&e, "air valve A1 would take air in the steady state", 700);
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
    const int p =
        add_pipe(b, id, route, 0.08 + 0.5 * chance(seed), 5.0 + 2000.0 * chance(seed));
    const kent_friction_law laws[] = {KENT_COLEBROOK_WHITE, KENT_HAZEN_WILLIAMS,
                                      KENT_MANNING, KENT_DARCY_FIXED};
    const double coefficients[] = {2e-4, 120.0, 0.011, 0.02};
    const int law = any(seed, 4);
    b->model->pipes[p].friction = laws[law];
    b->model->pipes[p].friction_coefficient = coefficients[law];
}

static void random_pump(kent_build *b, unsigned *seed, const char *id, const char *at,
                        const char *flow_to)
{
    const double top = 15.0 + 60.0 * chance(seed);
    const int p = kent_build_pump(b, id, at, flow_to, top, 0.02 + 0.1 * chance(seed),
                                  top * (0.5 + 0.4 * chance(seed)));
    kent_pump *pump = &b->model->pumps[p];
    pump->in_parallel = 1 + any(seed, 3);
    pump->running = any(seed, pump->in_parallel + 1);
    pump->check_valve = KENT_CHECK_IDEAL;
    pump->check_loss = any(seed, 2) ? 0.0 : 200.0 * chance(seed);
}

/* A pipe, two in three with a device in line. */
static void random_way(kent_build *b, unsigned *seed, const char *from, const char *to)
{
    char middle[24], id[24];
    const int what = any(seed, 6);
    const char *flow_to = any(seed, 2) ? from : to;
    if (what > 3) {
        random_pipe(b, seed, from, to);
        return;
    }
    (void)snprintf(middle, sizeof middle, "m%zu", b->model->point_count);
    (void)snprintf(id, sizeof id, "D%zu", b->model->point_count);
    kent_build_point(b, middle, 50.0 * (double)b->model->point_count,
                     500.0 * chance(seed), 30.0 * chance(seed));
    random_pipe(b, seed, from, middle);
    random_pipe(b, seed, middle, to);
    if (what < 2) {
        const int v = kent_build_check_valve(b, id, middle, flow_to);
        if (any(seed, 2)) b->model->check_valves[v].loss = 0.0;
    } else if (what == 2) {
        kent_build_control_valve(b, id, middle, flow_to,
                                 any(seed, 3) ? KENT_HOLDS_DOWNSTREAM
                                              : KENT_HOLDS_UPSTREAM,
                                 WEIGHT * (10.0 + 40.0 * chance(seed)));
    } else {
        random_pump(b, seed, id, middle, flow_to);
    }
}

static void random_end(kent_build *b, unsigned *seed, int i)
{
    char id[16];
    const int what = i == 0 ? 0 : any(seed, 9);
    (void)snprintf(id, sizeof id, "n%d", i);
    if (what == 0) {
        kent_build_fixed_level(b, id, 40.0 + 50.0 * chance(seed));
    } else if (what < 6) {
        const int o = kent_build_outflow(b, id, 0.06 * chance(seed) - 0.003);
        b->model->outflows[o].pressure_dependent = what > 2;
        b->model->outflows[o].full_pressure = 1e5 + 2e5 * chance(seed);
    } else if (what == 6) {
        kent_build_relief_valve(b, id, id, WEIGHT * (30.0 + 30.0 * chance(seed)), 0.02);
    }
}

/* A tree of points with chords. */
static kent_build random_network(unsigned *seed)
{
    kent_build b = kent_build_new();
    const int points = 4 + any(seed, 16);
    char id[16], other[16];

    for (int i = 0; i < points; i++) {
        (void)snprintf(id, sizeof id, "n%d", i);
        kent_build_point(&b, id, 50.0 * i, 500.0 * chance(seed), 30.0 * chance(seed));
    }
    for (int i = 1; i < points; i++) {
        (void)snprintf(id, sizeof id, "n%d", i < 3 ? 0 : i - 1 - any(seed, 3));
        (void)snprintf(other, sizeof other, "n%d", i);
        random_way(&b, seed, id, other);
    }
    for (int i = 0; i + 3 < points; i += 2) {
        (void)snprintf(id, sizeof id, "n%d", i);
        (void)snprintf(other, sizeof other, "n%d", i + 2 + any(seed, 2));
        random_way(&b, seed, id, other);
        if (any(seed, 4)) continue;
        (void)snprintf(other, sizeof other, "s%d", i);
        kent_build_point(&b, other, 50.0 * i + 7.0, 600.0, 5.0);
        random_pipe(&b, seed, other, id);
        (void)snprintf(id, sizeof id, "S%d", i);
        random_pump(&b, seed, id, other, NULL);
        b.model->pumps[b.model->pump_count - 1].suction_level = 10.0;
    }
    for (int i = 0; i < points; i++) {
        random_end(&b, seed, i);
    }
    return b;
}

/* Refused where water pumped in has no way out, or a standing pump cuts a part off. */
static void random_networks_satisfy_every_law(void **state)
{
    (void)state;
    unsigned seed = 4u;
    int solved = 0;
    enum { TRIALS = 400 };
    for (int trial = 0; trial < TRIALS; trial++) {
        kent_build b = random_network(&seed);
        kent_steady *s = NULL;
        kent_error err = {0};
        kent_build_derive(&b);
        const kent_status status = kent_steady_solve(b.model, &s, &err);
        if (status == KENT_OK) {
            check_all(&b, s);
            solved++;
        } else {
            if (status != KENT_E_INPUT || !strstr(err.what, "nothing fixes")) {
                fail_msg("%d: %s: %s", trial, err.where, err.what);
            }
        }
        kent_steady_free(s);
        kent_build_clear(&b);
    }
    assert_true(solved > TRIALS / 2);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_station_delivers_where_its_curve_meets_the_main),
        cmocka_unit_test(pump_and_system_meet_where_munson_finds_it),
        cmocka_unit_test(the_duty_of_one_beside_a_standing_one_is_its_own),
        cmocka_unit_test(a_pump_too_weak_for_the_lift_is_held_by_its_check_valve),
        cmocka_unit_test(a_standing_pump_lets_water_back_only_without_a_check_valve),
        cmocka_unit_test(boosters_in_series_add_their_lifts),
        cmocka_unit_test(the_weaker_of_two_stations_is_shut_out),
        cmocka_unit_test(a_bypass_passes_only_what_the_booster_does_not),
        cmocka_unit_test(flat_and_steep_curves_are_met_as_well),
        cmocka_unit_test(a_pump_behind_a_closed_valve_holds_its_head_at_no_flow),
        cmocka_unit_test(check_valves_pass_forward_and_nothing_back),
        cmocka_unit_test(water_that_cannot_leave_is_refused),
        cmocka_unit_test(a_reducing_valve_holds_what_it_is_set_to),
        cmocka_unit_test(a_dead_end_behind_a_reducing_valve_is_at_its_set_pressure),
        cmocka_unit_test(a_reducing_valve_that_cannot_hold_stands_open),
        cmocka_unit_test(a_reducing_valve_shuts_against_what_is_higher),
        cmocka_unit_test(a_sustaining_valve_holds_the_head_before_it),
        cmocka_unit_test(an_outflow_behind_a_sustaining_valve_gets_the_rest),
        cmocka_unit_test(a_relief_valve_opens_as_the_pressure_rises),
        cmocka_unit_test(vessels_and_tanks_rest_where_the_head_suits_them),
        cmocka_unit_test(tanks_that_would_not_rest_are_refused),
        cmocka_unit_test(random_networks_satisfy_every_law),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
