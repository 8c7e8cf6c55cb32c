#include "kent_steady.h"
#include "kent_duty_internal.h"
#include "kent_known_internal.h"
#include "kent_newton_internal.h"
#include "kent_outlet_internal.h"

#include <assert.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum {
    ROUNDS_TOGETHER = 10, /* rounds in which every contradicted link moves */
    ROUNDS = 300          /* and then one at a time, to this many in all */
};

void kent_steady_free(kent_steady *s)
{
    if (!s) return;
    free(s->node_head);
    free(s->span_flow);
    free(s->valve_flow);
    free(s->valve_capacity);
    free(s->outflow);
    free(s->device_flow);
    kent_model_view_free(s->view);
    free(s);
}

void kent_steady_free_states(kent_steady **s, size_t count)
{
    for (size_t i = 0; s && i < count; i++) {
        kent_steady_free(s[i]);
    }
    free((void *)s);
}

static kent_steady *steady_new(const kent_model *m)
{
    kent_steady *s = kent_alloc(1, sizeof *s);
    if (!s) return NULL;
    s->model = m;
    s->node_head = kent_alloc(m->node_count, sizeof *s->node_head);
    s->span_flow = kent_alloc(m->span_count, sizeof *s->span_flow);
    s->valve_flow = kent_alloc(m->valve_count, sizeof *s->valve_flow);
    s->valve_capacity = kent_alloc(m->valve_count, sizeof *s->valve_capacity);
    s->outflow = kent_alloc(m->outflow_count, sizeof *s->outflow);
    s->device_flow = kent_alloc(m->device_count, sizeof *s->device_flow);
    s->report = (kent_steady_report){
        .stop = KENT_STOP_CONVERGED, .worst_node = -1, .worst_span = -1};
    if (!s->node_head || !s->span_flow || !s->valve_flow || !s->valve_capacity ||
        !s->outflow || !s->device_flow) {
        kent_steady_free(s);
        return NULL;
    }
    return s;
}

static const char *node_name(const kent_model *m, int node)
{
    return m->points[m->nodes[node].point].id;
}

/* ---- what cannot be solved, whatever the flows ----------------------------------- */

/* Share of the full capacity at the steady opening. */
static double valve_share(const kent_valve *v)
{
    return kent_valve_relative_capacity(&v->curve, v->opening);
}

static kent_status check_valve_flows(const kent_model *m, kent_error *err)
{
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_valve *v = &m->valves[i];
        char where[160];
        if (!isnan(v->capacity)) continue;
        if (v->flow != 0.0 && isfinite(v->flow) && valve_share(v) > 0.0) continue;
        kent_model_place_text(m, v->place, where, sizeof where);
        return kent_error_set(err, KENT_E_INPUT, where,
                              "the coefficient of valve %s cannot be found from a flow "
                              "of %g m3/s at an opening of %g; give a flow that passes "
                              "it, or its loss, kv or cv",
                              v->id, v->flow, v->opening);
    }
    return KENT_OK;
}

/* ---- solving --------------------------------------------------------------------- */

static const char *stop_text(kent_stop stop)
{
    switch (stop) {
    case KENT_STOP_CONVERGED:
        return "it was found";
    case KENT_STOP_STALLED:
        return "the line search stalled";
    case KENT_STOP_LIMIT:
        return "the limit of iterations was reached";
    case KENT_STOP_SINGULAR:
        return "the equations have no single answer";
    }
    return "it stopped";
}

static void fill_report(const kent_equations *eq, const kent_newton_end *end,
                        kent_steady_report *r)
{
    const size_t gap_at = end->head_gap_at;
    *r = (kent_steady_report){.stop = end->stop,
                              .iterations = end->iterations,
                              .worst_imbalance = end->imbalance,
                              .worst_node = -1,
                              .worst_head_gap = fabs(end->head_gap),
                              .worst_span = -1};
    if (end->imbalance_at < eq->nodes) r->worst_node = (int)end->imbalance_at;
    if (gap_at >= eq->nodes && gap_at < eq->nodes + eq->spans) {
        r->worst_span = (int)(gap_at - eq->nodes);
    }
}

/* The valve, outflow or device behind a link. */
static const char *link_name(const kent_equations *eq, size_t link)
{
    const kent_model *m = eq->model;
    if (link < eq->first_outflow) return m->valves[link].id;
    if (link < eq->first_device) {
        return m->points[m->outflows[link - eq->first_outflow].point].id;
    }
    if (link < eq->first_standing) return m->devices[link - eq->first_device].id;
    return m->pumps[link - eq->first_standing].id;
}

/* Along which span or at which device a head equation is left open. */
static const char *gap_name(const kent_equations *eq, size_t equation)
{
    const kent_model *m = eq->model;
    if (equation < eq->nodes) return node_name(m, (int)equation);
    if (equation < eq->nodes + eq->spans) return m->spans[equation - eq->nodes].id;
    return equation < eq->size ? link_name(eq, equation - eq->nodes - eq->spans) : "";
}

static kent_status tell_failure(const kent_equations *eq, const kent_newton_end *end,
                                const kent_steady_report *r, kent_error *err)
{
    const kent_model *m = eq->model;
    const bool at_node = r->worst_node >= 0;
    const bool at_span = r->worst_span >= 0;
    return kent_error_set(
        err, KENT_E_SOLVE, "",
        "no steady state was found: %s after %d iterations; worst imbalance %.3g "
        "m3/s%s%s; worst head gap %.3g m %s%s",
        stop_text(r->stop), r->iterations, r->worst_imbalance,
        at_node ? " at point " : "", at_node ? node_name(m, r->worst_node) : "",
        r->worst_head_gap, at_span ? "along " : "at ", gap_name(eq, end->head_gap_at));
}

static kent_status tell_switching(const kent_equations *eq, size_t which,
                                  int iterations, kent_error *err)
{
    /* unreached: networks that do so are too large and odd for a test */
    return kent_error_set(err, KENT_E_SOLVE, "",
                          "no steady state was found: after %d iterations %s still "
                          "switches between all, part and none of its flow",
                          iterations, link_name(eq, which));
}

/* A number that looks like chance, the same every time. */
static size_t scattered(int round)
{
    const uint64_t mixed = ((uint64_t)round + 1U) * UINT64_C(0x9E3779B97F4A7C15);
    return (size_t)((mixed ^ (mixed >> 29)) * UINT64_C(0xBF58476D1CE4E5B9) >> 33);
}

/* Puts links under the laws that the solution x calls for. In late rounds only the
 * first one that is found changes, looking from another one each time, so that they
 * cannot chase each other for ever. Returns whether any changed; one of them is link
 * *which. */
static bool switch_laws(kent_equations *eq, const double *x, int round, size_t *which)
{
    const size_t outflows = eq->model->outflow_count;
    const size_t count = outflows + eq->model->device_count;
    const bool one = round >= ROUNDS_TOGETHER;
    bool any = false;

    for (size_t k = 0; k < count && !(one && any); k++) {
        const size_t i = (scattered(round) + k) % count;
        const bool changed = i < outflows ? kent_outlet_switch(eq, x, i)
                                          : kent_duty_switch(eq, x, i - outflows);
        if (!changed) continue;
        any = true;
        *which = eq->first_outflow + i;
    }
    return any;
}

/* Newton's method for given laws of links, then laws for what it found, until both
 * agree. */
static kent_status settle(kent_equations *eq, double *x, kent_steady_report *report,
                          kent_error *err)
{
    kent_newton *nw = NULL;
    kent_newton_end end = {0};
    int iterations = 0;
    bool changed = true;
    size_t which = 0;
    unsigned char *opened = kent_alloc(eq->links, sizeof *opened);

    kent_status status = kent_newton_new(eq, &nw, err);
    if (!opened) status = kent_error_nomem(err);
    if (status != KENT_OK) goto done;
    for (int round = 0; round < ROUNDS && changed; round++) {
        status = kent_newton_solve(nw, x, &end, err);
        if (status != KENT_OK) goto done;
        iterations += end.iterations;
        if (end.stop != KENT_STOP_CONVERGED) break;
        changed = switch_laws(eq, x, round, &which);
        if (changed) status = kent_known_restore(eq, opened, err);
        if (status != KENT_OK) goto done;
    }
    end.iterations = iterations;
    fill_report(eq, &end, report);
    if (end.stop != KENT_STOP_CONVERGED) {
        status = tell_failure(eq, &end, report, err);
    } else if (changed) {
        status = tell_switching(eq, which, iterations, err);
    }
done:
    kent_newton_free(nw);
    free(opened);
    return status;
}

/* ---- the result ------------------------------------------------------------------ */

/* Capacity at full opening that passes the given flow between the heads found. (6.10)
 */
static kent_status find_capacity(const kent_model *m, const kent_valve *v,
                                 const double *head, double *capacity, kent_error *err)
{
    const double before = head[v->node[0]];
    const double after = v->node[1] >= 0 ? head[v->node[1]] : v->discharge_level;
    const double drop = copysign(1.0, v->flow) * (before - after); /* m, along it */
    char where[160];

    if (drop > 0.0) {
        *capacity = fabs(v->flow) / sqrt(drop) / valve_share(v);
        return KENT_OK;
    }
    kent_model_place_text(m, v->place, where, sizeof where);
    return kent_error_set(
        err, KENT_E_INPUT, where,
        "valve %s cannot pass %g m3/s: the head would be %.3f m before it and %.3f m "
        "behind it; lower its flow or %s, or give its loss, kv or cv instead",
        v->id, v->flow, before, after,
        v->node[1] >= 0 ? "the level it leads to" : "its discharge_level");
}

static kent_status take_result(const kent_equations *eq, const double *x,
                               kent_steady *s, kent_error *err)
{
    const kent_model *m = eq->model;
    const double *link = x + eq->nodes + eq->spans;

    memcpy(s->node_head, x, eq->nodes * sizeof *x);
    memcpy(s->span_flow, x + eq->nodes, eq->spans * sizeof *x);
    memcpy(s->valve_flow, link, m->valve_count * sizeof *x);
    memcpy(s->outflow, link + eq->first_outflow, m->outflow_count * sizeof *x);
    for (size_t i = 0; i < m->device_count; i++) {
        s->device_flow[i] = kent_duty_flow(eq, x, i);
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_valve *v = &m->valves[i];
        s->valve_capacity[i] = v->capacity;
        if (!isnan(v->capacity)) continue;
        if (find_capacity(m, v, s->node_head, &s->valve_capacity[i], err) != KENT_OK) {
            return err->status;
        }
    }
    return KENT_OK;
}

kent_status kent_steady_solve(const kent_model *m, kent_steady **out, kent_error *err)
{
    kent_status status = KENT_OK;
    kent_equations *eq = NULL;
    double *x = NULL;
    kent_steady *s = steady_new(m);

    if (!s) {
        status = kent_error_nomem(err);
        goto done;
    }
    if (m->span_count > 0) { /* else only fittings with ports of their own */
        status = check_valve_flows(m, err);
        if (status != KENT_OK) goto done;
        status = kent_equations_new(m, &eq, err);
        if (status != KENT_OK) goto done;
        status = kent_known_check(eq, err);
        if (status != KENT_OK) goto done;
        x = kent_alloc(eq->size, sizeof *x);
        if (!x) {
            status = kent_error_nomem(err);
            goto done;
        }
        kent_equations_start(eq, x);
        status = settle(eq, x, &s->report, err);
        if (status != KENT_OK) goto done;
        status = kent_duty_check(eq, x, err);
        if (status != KENT_OK) goto done;
        status = take_result(eq, x, s, err);
        if (status != KENT_OK) goto done;
    }
    *out = s;
    s = NULL; /* handed over */
done:
    free(x);
    kent_equations_free(eq);
    kent_steady_free(s);
    return status;
}

/* Every message of a case with several states begins with the state's. */
static kent_status tell_state(const kent_model *m, size_t state,
                              const kent_error *cause, kent_error *err)
{
    if (cause->status == KENT_E_NOMEM || m->state_count < 2) {
        return kent_error_set(err, cause->status, cause->where, "%s", cause->what);
    }
    return kent_error_set(err, cause->status, cause->where, "in state \"%s\": %.400s",
                          m->states[state].id, cause->what);
}

/* One state into *out; capacity as of kent_model_in_state. */
static kent_status solve_state(const kent_model *m, size_t state,
                               const double *capacity, kent_steady **out,
                               kent_error *err)
{
    kent_error cause = {0};
    kent_steady *s = NULL;
    kent_model *view = kent_model_in_state(m, (int)state, capacity);

    if (!view) return kent_error_nomem(err);
    (void)kent_steady_solve(view, &s, &cause);
    if (!s) {
        kent_model_view_free(view);
        return tell_state(m, state, &cause, err);
    }
    s->view = view;
    *out = s;
    return KENT_OK;
}

kent_status kent_steady_solve_states(const kent_model *m, kent_steady **out,
                                     kent_error *err)
{
    kent_status status = KENT_OK;
    const double *capacity = NULL;

    for (size_t i = 0; i < m->state_count; i++) {
        out[i] = NULL;
    }
    for (size_t i = 0; i < m->state_count && !status; i++) {
        status = solve_state(m, i, capacity, &out[i], err);
        if (i == 0 && out[0]) capacity = out[0]->valve_capacity;
    }
    return status;
}

/* m3/s through one unit that stands without a check valve; its head goes with the
 * square of its flow. */
static double flow_standing(const kent_pump_curve *c, double lift)
{
    const double q = lift > 0.0 ? -c->rated_flow : c->rated_flow;
    return q * sqrt(lift / kent_pump_at(c, q, 0.0).head);
}

kent_pump_duty kent_steady_pump(const kent_steady *s, size_t device)
{
    const kent_device *d = &s->model->devices[device];
    assert(d->kind == KENT_DEVICE_PUMP);
    const kent_pump *p = &s->model->pumps[d->index];
    const double before = d->node[0] >= 0 ? s->node_head[d->node[0]] : p->suction_level;
    kent_pump_duty duty = {.running = p->running,
                           .flow = s->device_flow[device],
                           .lift = s->node_head[d->node[1]] - before};
    if (p->running > 0) {
        const double speed = p->curve.rated_speed;
        const int standing =
            p->check_valve == KENT_CHECK_NONE ? p->in_parallel - p->running : 0;
        duty.of_one = duty.flow;
        if (standing > 0) duty.of_one -= standing * flow_standing(&p->curve, duty.lift);
        duty.of_one /= p->running;
        const kent_pump_point at = kent_pump_at(&p->curve, duty.of_one, speed);
        duty.power = p->running * at.torque * speed;
    }
    return duty;
}

double kent_steady_head(const kent_model *m, const kent_steady *s, int span,
                        double chainage)
{
    assert(span >= 0 && (size_t)span < m->span_count);
    const kent_span *e = &m->spans[span];
    const double share = chainage / e->length;
    return (1.0 - share) * s->node_head[e->node[0]] + share * s->node_head[e->node[1]];
}
