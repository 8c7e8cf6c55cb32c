/* Pumps: their curve, the units, and the check valve behind each. */
#include "kent_case_internal.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static void fill_flow_head(kent_filling *f, kent_record *record, kent_pump_curve *c)
{
    if (!kent_record_has(record, "flow_head")) return;
    c->count = kent_record_pairs(&f->reader, record, "flow_head", KENT_FLOW,
                                 KENT_LENGTH, KENT_PUMP_POINTS, c->flow, c->head);
}

static void fill_rated(kent_filling *f, kent_record *record, kent_pump_curve *c)
{
    kent_reader *r = &f->reader;
    const kent_twig *pair = kent_record_field(record, "rated")->twig;
    if (!pair) return;
    if (kent_twig_count(pair) != 2) {
        kent_record_complain(r, record, "rated",
                             "rated must be one pair, as ( \"%s\", \"%s\" )",
                             kent_kind_example(KENT_FLOW, r->system),
                             kent_kind_example(KENT_LENGTH, r->system));
        return;
    }
    c->rated_flow =
        kent_record_item(r, record, kent_twig_child(pair, 0), "rated", true, KENT_FLOW);
    c->rated_head = kent_record_item(r, record, kent_twig_child(pair, 1), "rated", true,
                                     KENT_LENGTH);
}

/* A straight line between pairs; x lies within them. */
static double between(const double *x, const double *y, size_t count, double at)
{
    size_t i = 1;
    while (i + 1 < count && x[i] < at) {
        i++;
    }
    return y[i - 1] + (y[i] - y[i - 1]) * (at - x[i - 1]) / (x[i] - x[i - 1]);
}

/* Pairs (flow, efficiency) have to rise from no flow and reach over the curve's. */
static bool efficiencies_serve(kent_filling *f, kent_record *record,
                               const kent_pump_curve *c, const double *flow,
                               const double *efficiency, size_t count)
{
    kent_reader *r = &f->reader;
    const char *key = "flow_efficiency";
    for (size_t i = 0; i < count; i++) {
        const bool rises = i == 0 ? !(fabs(flow[0]) > 0.0) : flow[i] > flow[i - 1];
        if (rises && efficiency[i] >= 0.0 && efficiency[i] <= 1.0) continue;
        kent_record_complain(r, record, key,
                             "pair %zu of flow_efficiency: flows must rise from 0 on, "
                             "and efficiencies be within 0 to 1",
                             i + 1);
        return false;
    }
    const double needed =
        fmax(c->count > 0 ? c->flow[c->count - 1] : 0.0, c->rated_flow);
    if (count >= 2 && flow[count - 1] >= needed) return true;
    kent_record_complain(r, record, key,
                         "flow_efficiency has to reach from no flow to the last of "
                         "flow_head, and to the rated flow");
    return false;
}

static void fill_efficiencies(kent_filling *f, kent_record *record, kent_pump_curve *c)
{
    double flow[KENT_PUMP_POINTS];
    double efficiency[KENT_PUMP_POINTS];
    const size_t count =
        kent_record_pairs(&f->reader, record, "flow_efficiency", KENT_FLOW, KENT_RATIO,
                          KENT_PUMP_POINTS, flow, efficiency);
    if (!record->sound || !efficiencies_serve(f, record, c, flow, efficiency, count)) {
        return;
    }
    for (size_t i = 0; i < c->count; i++) {
        c->efficiency[i] = between(flow, efficiency, count, c->flow[i]);
    }
    c->rated_efficiency = between(flow, efficiency, count, c->rated_flow);
}

/* Below this rated efficiency the published characteristics give a pump that turns
 * backwards more power than its water has (chapter 13). */
static const double LEAST_EFFICIENCY = 0.65;

/* What follows from a curve that is whole. */
static void complete_curve(kent_filling *f, kent_record *record, kent_pump *p)
{
    kent_model *m = f->model;
    if (!record->sound) return;
    const char *wrong =
        kent_pump_curve_complete(&p->curve, m->water.density, m->gravity);
    if (wrong) {
        kent_record_complain(&f->reader, record, "flow_head",
                             "%s; correct flow_head or rated", wrong);
        return;
    }
    if (p->curve.rated_efficiency < LEAST_EFFICIENCY) {
        kent_notes_add(
            &m->cautions,
            "pump %s: a rated efficiency of %.3g is less than that of any pump "
            "whose complete characteristics are published (%.2f): turned "
            "backwards by the water it is taken for a better turbine than it "
            "is, and runs faster; is it the efficiency at the rated flow?",
            p->id, p->curve.rated_efficiency, LEAST_EFFICIENCY);
    }
    if (!p->curve.outside) return;
    char caution[400];
    kent_pump_caution(&p->curve, caution, sizeof caution);
    kent_notes_add(&m->cautions, "pump %s: %s", p->id, caution);
}

static void fill_inertia(kent_filling *f, kent_record *record, kent_pump *p)
{
    const kent_pump_curve *c = &p->curve;
    const kent_model *m = f->model;
    p->inertia = kent_record_number(record, "inertia");
    p->inertia_estimated = !kent_record_has(record, "inertia");
    if (!record->sound || !p->inertia_estimated) return;
    const double power = m->water.density * m->gravity * c->rated_flow * c->rated_head /
                         c->rated_efficiency;
    p->inertia = kent_fill_usual(
        f, record, KENT_DEVICE_PUMP, "inertia",
        kent_pump_inertia_estimate(power, c->rated_speed),
        "not given: by regression on rated power and speed, +-50 %; it governs what a "
        "trip does");
}

static void fill_curve(kent_filling *f, kent_record *record, kent_pump_curve *c)
{
    const bool pairs = kent_record_has(record, "flow_efficiency");
    fill_flow_head(f, record, c);
    fill_rated(f, record, c);
    for (size_t i = 0; i < KENT_PUMP_POINTS; i++) {
        c->efficiency[i] = NAN;
    }
    c->rated_efficiency = kent_record_number(record, "efficiency");
    c->rated_speed = kent_record_number(record, "speed");
    const double stages = kent_record_number_or(record, "stages", 1.0);
    const double suctions = kent_record_number_or(record, "suctions", 1.0);
    if (!record->sound) return;
    c->stages = (int)stages;
    c->suctions = (int)suctions;
    if (pairs == kent_record_has(record, "efficiency")) {
        kent_record_complain(&f->reader, record, pairs ? "efficiency" : NULL,
                             pairs ? "efficiency and flow_efficiency are both given; "
                                     "keep one"
                                   : "its efficiency is not known; give efficiency, at "
                                     "the rated flow, or flow_efficiency");
    } else if (pairs) {
        fill_efficiencies(f, record, c);
    }
}

static void fill_check_valve(kent_filling *f, kent_record *record, kent_pump *p)
{
    kent_reader *r = &f->reader;
    const int kind = kent_record_field(record, "check_valve")->index;
    p->check_valve = kind >= 0 ? (kent_check_kind)kind : KENT_CHECK_IDEAL;
    p->check_delay = kent_record_number(record, "check_valve_delay");
    p->check_size = kent_record_number(record, "check_valve_size");
    const double loss = kent_record_number_or(record, "check_valve_loss", 0.0);
    if (!record->sound) return;
    if (!kent_record_has(record, "check_valve")) {
        kent_fill_assume_of(f, record, KENT_DEVICE_PUMP, "check_valve", "ideal",
                            "not given");
    }
    const bool delayed = p->check_valve == KENT_CHECK_DELAYED;
    if (delayed == isnan(p->check_delay)) {
        kent_record_complain(r, record, delayed ? "check_valve" : "check_valve_delay",
                             delayed ? "a delayed check valve needs check_valve_delay, "
                                       "from reversal to closure"
                                     : "check_valve_delay is of check_valve = "
                                       "\"delayed\"; leave one out");
    } else if (p->check_valve == KENT_CHECK_NONE &&
               (!isnan(p->check_size) || loss > 0.0)) {
        kent_record_complain(r, record, "check_valve",
                             "check_valve is \"none\", and a loss or size of it is "
                             "given; keep one");
    } else if (loss > 0.0 && isnan(p->check_size)) {
        kent_record_complain(r, record, "check_valve_loss",
                             "check_valve_loss needs check_valve_size, which it is on");
    } else if (loss > 0.0) {
        const double e =
            kent_valve_capacity_from_loss(loss, p->check_size, f->model->gravity);
        p->check_loss = 1.0 / (e * e);
    } else if (p->check_valve != KENT_CHECK_NONE) {
        (void)kent_fill_usual(f, record, KENT_DEVICE_PUMP, "check_valve_loss", 0.0,
                              "not given");
    }
}

static void fill_units(kent_filling *f, kent_record *record, kent_pump *p)
{
    const double units = kent_record_number_or(record, "in_parallel", 1.0);
    const double running = kent_record_number_or(record, "running", units);
    if (!record->sound) return;
    p->in_parallel = (int)units;
    p->running = (int)running;
    if (p->in_parallel > 1 && !kent_record_has(record, "running")) {
        kent_fill_assume_of(f, record, KENT_DEVICE_PUMP, "running", "all",
                            "not given: every unit in_parallel runs");
    }
    if (p->running > p->in_parallel) {
        kent_record_complain(&f->reader, record, "running",
                             "running = %d is more than the %d in_parallel", p->running,
                             p->in_parallel);
    }
}

/* In line, or from a level. */
static void fill_place(kent_filling *f, kent_record *record, kent_pump *p)
{
    p->point = kent_record_field(record, "at")->index;
    p->flow_to = kent_record_field(record, "flow_to")->index;
    p->suction_level = kent_record_number(record, "suction_level");
    p->node[0] = p->node[1] = -1;
    p->place = record->place;
    if (!record->sound) return;
    if (kent_record_has(record, "flow_to") == !isnan(p->suction_level)) {
        kent_record_complain(
            &f->reader, record, p->flow_to >= 0 ? "flow_to" : NULL,
            p->flow_to >= 0
                ? "flow_to is of a pump in line, suction_level of one that starts a "
                  "pipe; keep one"
                : "give suction_level for a pump that starts a pipe, or flow_to, the "
                  "next point that it delivers to, for one in line");
    }
}

void kent_fill_pump(kent_filling *f, kent_record *record, size_t index)
{
    kent_pump *p = &f->model->pumps[index];
    kent_record_copy(record, "id", NULL, p->id, sizeof p->id);
    kent_reader_shelve(&f->reader, KENT_SHELF_PUMPS,
                       kent_record_field(record, "id")->text, (int)index,
                       (kent_place){-1, 0});
    fill_place(f, record, p);
    fill_units(f, record, p);
    fill_curve(f, record, &p->curve);
    fill_check_valve(f, record, p);
    complete_curve(f, record, p);
    fill_inertia(f, record, p);
}
