#include "kent_duty_internal.h"

#include <math.h>

/* m, and in shares of the flow of 1 m/s in the largest span: what rounding may do
 * without a device changing its law. */
static const double SLACK = 1e-10, REVERSED = 1e-12;

/* m of piezometric head at a gauge pressure (Pa) at a point. */
static double head_of(const kent_model *m, double pressure, int point)
{
    return m->points[point].at.z + pressure / (m->water.density * m->gravity);
}

/* s2/m5 from K on a size (m). */
static double resistance_of(const kent_model *m, double loss, double size)
{
    static const double PI = 3.14159265358979323846;
    const double area = 0.25 * PI * size * size;
    return loss / (2.0 * m->gravity * area * area);
}

/* ---- where they start ------------------------------------------------------------ */

static void start_pump(const kent_pump *p, kent_link *running, kent_link *standing)
{
    running->level = standing->level = p->suction_level;
    running->curve = standing->curve = &p->curve;
    running->units = (double)p->running;
    running->speed = p->curve.rated_speed;
    running->resistance = p->check_loss;
    standing->units = (double)(p->in_parallel - p->running);
    if (p->running > 0) running->law = KENT_LINK_PUMP;
    if (p->running < p->in_parallel && p->check_valve == KENT_CHECK_NONE) {
        standing->law = KENT_LINK_PUMP;
    }
}

static void start_relief(const kent_model *m, const kent_relief_valve *r,
                         kent_link *link)
{
    link->level = r->discharge_level;
    link->capacity = r->capacity;
    link->resistance = 1.0 / (r->capacity * r->capacity);
    link->set = head_of(m, r->set_pressure, r->point);
    link->full = head_of(m, r->full_open_pressure, r->point);
}

static void start_device(kent_equations *eq, size_t i)
{
    const kent_model *m = eq->model;
    const kent_device *d = &m->devices[i];
    kent_link *link = &eq->link[eq->first_device + i];

    *link = (kent_link){.law = KENT_LINK_FLOW, .node = {d->node[0], d->node[1]}};
    switch (d->kind) {
    case KENT_DEVICE_PUMP: {
        kent_link *standing = &eq->link[eq->first_standing + (size_t)d->index];
        *standing = *link;
        start_pump(&m->pumps[d->index], link, standing);
        break;
    }
    case KENT_DEVICE_CHECK_VALVE: {
        const kent_check_valve *v = &m->check_valves[d->index];
        link->law = KENT_LINK_LOSS;
        link->resistance = resistance_of(m, v->loss, v->size);
        break;
    }
    case KENT_DEVICE_CONTROL_VALVE: {
        const kent_control_valve *v = &m->control_valves[d->index];
        link->law = KENT_LINK_LOSS;
        link->resistance = 1.0 / (v->capacity * v->capacity);
        link->level = head_of(m, v->set_pressure, v->point);
        link->held = v->holds == KENT_HOLDS_UPSTREAM ? 0 : 1;
        break;
    }
    case KENT_DEVICE_RELIEF_VALVE:
        start_relief(m, &m->relief_valves[d->index], link);
        break;
    case KENT_DEVICE_SURGE_TANK:
    case KENT_DEVICE_ONE_WAY_TANK:
    case KENT_DEVICE_AIR_VESSEL:
    case KENT_DEVICE_AIR_VALVE:
    case KENT_DEVICE_BURST:
    case KENT_DEVICE_KINDS:
        break; /* nothing flows */
    }
}

void kent_duty_start(kent_equations *eq)
{
    for (size_t i = 0; i < eq->model->device_count; i++) {
        start_device(eq, i);
    }
}

/* ---- from law to law ------------------------------------------------------------- */

/* What a solution says of one device's link. */
typedef struct found {
    double before, behind; /* m */
    double flow;           /* m3/s */
    bool reversed;
} found;

static found look(const kent_equations *eq, const double *x, size_t device)
{
    const size_t l = eq->first_device + device;
    const kent_link *link = &eq->link[l];
    found f = {.flow = x[eq->nodes + eq->spans + l]};
    f.before = link->node[0] >= 0 ? x[link->node[0]] : link->level;
    f.behind = link->node[1] >= 0 ? x[link->node[1]] : link->level;
    f.reversed = f.flow < -REVERSED * eq->flow_scale;
    return f;
}

/* Shut where water would flow back; open where it would flow on. */
static kent_link_law one_way(const kent_link *link, const found *f, kent_link_law open)
{
    if (link->law == open) return f->reversed ? KENT_LINK_FLOW : open;
    const double lift = open == KENT_LINK_PUMP ? kent_link_lift(link, 0.0) : 0.0;
    return f->before + lift > f->behind + SLACK ? open : KENT_LINK_FLOW;
}

/* Holds what is set where it can; else open; shut where water would flow back. */
static kent_link_law control(const kent_link *link, const found *f)
{
    const double at_set = link->level;
    const bool throttles =
        link->held == 1 ? f->behind > at_set + SLACK : f->before < at_set - SLACK;
    const bool could =
        link->held == 1 ? f->behind < at_set - SLACK : f->before > at_set + SLACK;
    switch (link->law) {
    case KENT_LINK_LOSS:
        if (f->reversed) return KENT_LINK_FLOW;
        return throttles ? KENT_LINK_HEAD : KENT_LINK_LOSS;
    case KENT_LINK_HEAD:
        if (f->reversed) return KENT_LINK_FLOW;
        return f->before - f->behind < link->resistance * f->flow * f->flow - SLACK
                   ? KENT_LINK_LOSS
                   : KENT_LINK_HEAD;
    case KENT_LINK_FLOW:
    case KENT_LINK_PUMP:
    case KENT_LINK_RELIEF:
        break;
    }
    if (!could || !(f->before > f->behind + SLACK)) return KENT_LINK_FLOW;
    return KENT_LINK_LOSS;
}

static kent_link_law relief(const kent_link *link, double head)
{
    switch (link->law) {
    case KENT_LINK_RELIEF:
        if (head < link->set) return KENT_LINK_FLOW;
        return head > link->full ? KENT_LINK_LOSS : KENT_LINK_RELIEF;
    case KENT_LINK_LOSS:
        return head < link->full - SLACK ? KENT_LINK_RELIEF : KENT_LINK_LOSS;
    case KENT_LINK_FLOW:
    case KENT_LINK_HEAD:
    case KENT_LINK_PUMP:
        break;
    }
    return head > link->set + SLACK ? KENT_LINK_RELIEF : KENT_LINK_FLOW;
}

static bool is_one_way_pump(const kent_model *m, const kent_device *d)
{
    const kent_pump *p = &m->pumps[d->index];
    return p->running > 0 && p->check_valve != KENT_CHECK_NONE;
}

static kent_link_law law_of(const kent_equations *eq, const double *x, size_t i)
{
    const kent_device *d = &eq->model->devices[i];
    const kent_link *link = &eq->link[eq->first_device + i];
    const found f = look(eq, x, i);

    switch (d->kind) {
    case KENT_DEVICE_PUMP:
        if (!is_one_way_pump(eq->model, d)) break;
        return one_way(link, &f, KENT_LINK_PUMP);
    case KENT_DEVICE_CHECK_VALVE:
        return one_way(link, &f, KENT_LINK_LOSS);
    case KENT_DEVICE_CONTROL_VALVE:
        return control(link, &f);
    case KENT_DEVICE_RELIEF_VALVE:
        return relief(link, f.before);
    case KENT_DEVICE_SURGE_TANK:
    case KENT_DEVICE_ONE_WAY_TANK:
    case KENT_DEVICE_AIR_VESSEL:
    case KENT_DEVICE_AIR_VALVE:
    case KENT_DEVICE_BURST:
    case KENT_DEVICE_KINDS:
        break;
    }
    return link->law;
}

bool kent_duty_switch(kent_equations *eq, const double *x, size_t device)
{
    kent_link *link = &eq->link[eq->first_device + device];
    const kent_link_law law = law_of(eq, x, device);
    if (law == link->law) return false;
    link->law = law;
    return true;
}

bool kent_duty_is_shut(const kent_equations *eq, size_t device)
{
    const kent_device *d = &eq->model->devices[device];
    if (eq->link[eq->first_device + device].law != KENT_LINK_FLOW) return false;
    if (d->kind == KENT_DEVICE_PUMP) return is_one_way_pump(eq->model, d);
    return d->kind == KENT_DEVICE_CHECK_VALVE || d->kind == KENT_DEVICE_CONTROL_VALVE;
}

void kent_duty_open(kent_equations *eq, size_t device)
{
    const bool pump = eq->model->devices[device].kind == KENT_DEVICE_PUMP;
    eq->link[eq->first_device + device].law = pump ? KENT_LINK_PUMP : KENT_LINK_LOSS;
}

/* ---- the result ------------------------------------------------------------------ */

double kent_duty_flow(const kent_equations *eq, const double *x, size_t device)
{
    const kent_device *d = &eq->model->devices[device];
    const double *flow = x + eq->nodes + eq->spans;
    const double q = flow[eq->first_device + device];
    switch (d->kind) {
    case KENT_DEVICE_PUMP:
        if (is_one_way_pump(eq->model, d)) return fmax(q, 0.0);
        return q + flow[eq->first_standing + (size_t)d->index];
    case KENT_DEVICE_CHECK_VALVE:
    case KENT_DEVICE_CONTROL_VALVE:
    case KENT_DEVICE_RELIEF_VALVE:
        return fmax(q, 0.0); /* rounding may have left it a little less */
    case KENT_DEVICE_SURGE_TANK:
    case KENT_DEVICE_ONE_WAY_TANK:
    case KENT_DEVICE_AIR_VESSEL:
    case KENT_DEVICE_AIR_VALVE:
    case KENT_DEVICE_BURST:
    case KENT_DEVICE_KINDS:
        break;
    }
    return 0.0;
}

/* A pump that runs without a check valve while water runs back through it. */
static kent_status check_pump(const kent_equations *eq, const double *x, size_t i,
                              kent_error *err)
{
    const kent_model *m = eq->model;
    const kent_pump *p = &m->pumps[m->devices[i].index];
    const found f = look(eq, x, i);
    char where[160];

    if (p->running == 0 || !f.reversed) return KENT_OK;
    kent_model_place_text(m, p->place, where, sizeof where);
    return kent_error_set(
        err, KENT_E_INPUT, where,
        "pump %s cannot deliver: it lifts %.2f m at no flow, more is needed, and water "
        "would run back through it; give it a check_valve, more head, or running = 0",
        p->id, kent_link_lift(&eq->link[eq->first_device + i], 0.0));
}

static kent_status check_surge_tank(const kent_model *m, const kent_surge_tank *t,
                                    double head, kent_error *err)
{
    char where[160];
    if (head >= t->bottom_level - SLACK && head <= t->overflow_level + SLACK) {
        return KENT_OK;
    }
    kent_model_place_text(m, t->place, where, sizeof where);
    if (head > t->overflow_level) {
        return kent_error_set(err, KENT_E_INPUT, where,
                              "surge tank %s would overflow in the steady state: the "
                              "head there is %.3f m, its overflow_level %.3f m; raise "
                              "the overflow or lower the levels that feed it",
                              t->id, head, t->overflow_level);
    }
    return kent_error_set(err, KENT_E_INPUT, where,
                          "surge tank %s would be empty in the steady state: the head "
                          "there is %.3f m, its bottom_level %.3f m; lower the bottom "
                          "or raise the levels that feed it",
                          t->id, head, t->bottom_level);
}

static kent_status check_one_way_tank(const kent_model *m, const kent_one_way_tank *t,
                                      double head, kent_error *err)
{
    char where[160];
    if (head >= t->level - SLACK) return KENT_OK;
    kent_model_place_text(m, t->place, where, sizeof where);
    return kent_error_set(err, KENT_E_INPUT, where,
                          "one-way surge tank %s would run empty in the steady state: "
                          "its level is %.3f m, the head there only %.3f m; give it a "
                          "level below that",
                          t->id, t->level, head);
}

static kent_status check_air_valve(const kent_model *m, const kent_air_valve *v,
                                   double head, kent_error *err)
{
    const double z = m->points[v->point].at.z;
    char where[160];
    if (head >= z - SLACK) return KENT_OK;
    kent_model_place_text(m, v->place, where, sizeof where);
    return kent_error_set(
        err, KENT_E_INPUT, where,
        "air valve %s would take air in the steady state: the head there is %.3f m, "
        "the pipe lies at %.3f m; such a main does not run full: lower the pipe, raise "
        "the levels, or throttle what leaves it further down",
        v->id, head, z);
}

kent_status kent_duty_check(const kent_equations *eq, const double *x, kent_error *err)
{
    const kent_model *m = eq->model;
    kent_status status = KENT_OK;
    for (size_t i = 0; i < m->device_count && status == KENT_OK; i++) {
        const kent_device *d = &m->devices[i];
        const double head = d->node[0] >= 0 ? x[d->node[0]] : (double)NAN;
        switch (d->kind) {
        case KENT_DEVICE_PUMP:
            status = check_pump(eq, x, i, err);
            break;
        case KENT_DEVICE_SURGE_TANK:
            status = check_surge_tank(m, &m->surge_tanks[d->index], head, err);
            break;
        case KENT_DEVICE_ONE_WAY_TANK:
            status = check_one_way_tank(m, &m->one_way_tanks[d->index], head, err);
            break;
        case KENT_DEVICE_AIR_VALVE:
            status = check_air_valve(m, &m->air_valves[d->index], head, err);
            break;
        case KENT_DEVICE_CHECK_VALVE:
        case KENT_DEVICE_CONTROL_VALVE:
        case KENT_DEVICE_AIR_VESSEL:
        case KENT_DEVICE_RELIEF_VALVE:
        case KENT_DEVICE_BURST:
        case KENT_DEVICE_KINDS:
            break;
        }
    }
    return status;
}
