#include "kent_recorder_internal.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;

double kent_thrust_horizontal(kent_vec3 thrust) { return hypot(thrust.x, thrust.y); }

double kent_thrust_azimuth(kent_vec3 thrust)
{
    const double azimuth = atan2(thrust.x, thrust.y);

    return azimuth < 0.0 ? azimuth + 2.0 * PI : azimuth;
}

/* ---- one case -------------------------------------------------------------------- */

static const kent_march NO_MARCH = {-1, -1};

static double kind_factor(const kent_model *m, kent_case_kind kind)
{
    const double factor = m->loads.factor[kind];
    return isnan(factor) ? m->rules.safety_factor : factor;
}

static kent_load_case *loads_add(const kent_model *m, kent_fitting_loads *loads,
                                 kent_case_kind kind, kent_march march)
{
    kent_load_case *c = &loads->cases[loads->count++];

    *c = (kent_load_case){
        .kind = kind,
        .scenario = march.scenario,
        .state = march.state,
        .safety_factor = kind_factor(m, kind),
        .above_90_percent = NAN,
        .step = NAN,
    };
    for (size_t k = 0; k < KENT_SENSES; k++) {
        c->worst[k].time = NAN;
    }
    return c;
}

/* A case of one instant: it is the worst of every sense that it has. */
static void case_fill(kent_load_case *c, const kent_instant *instant)
{
    for (int k = 0; k < KENT_SENSES; k++) {
        if (kent_instant_has_sense(instant, (kent_sense)k)) c->worst[k] = *instant;
    }
}

static void case_name(const kent_model *m, kent_load_case *c, const char *name)
{
    (void)snprintf(c->name, sizeof c->name, "%s", name);
    c->title = kent_name_in_state(m, c->name, c->state);
}

/* Pa under the field test, by elevation from where the gauge is read (9.1). */
static double fitting_test_pressure(const kent_model *m, const kent_fitting *f)
{
    const int gauge = m->loads.test_gauge;
    const double level = gauge >= 0 ? m->points[gauge].at.z : f->at.z;

    return m->loads.test_pressure + m->water.density * m->gravity * (level - f->at.z);
}

/* Pa without flow under the highest connected level, or the one stated (9.2). */
static double fitting_static_pressure(const kent_model *m, const kent_fitting *f)
{
    const kent_port *port = &m->ports[f->port_first];
    const double level = kent_static_level(m, m->spans[port->span].node[0]);

    return kent_model_pressure(m, level, f->at.z);
}

static void loads_add_at_rest(const kent_model *m, const kent_fitting *f,
                              kent_fitting_loads *loads)
{
    if (!isnan(m->loads.test_pressure)) {
        kent_load_case *c = loads_add(m, loads, KENT_CASE_TEST, NO_MARCH);
        const kent_instant i =
            kent_instant_at_rest(m, f, fitting_test_pressure(m, f), -1);
        case_name(m, c, "test");
        case_fill(c, &i);
    }
    kent_load_case *c = loads_add(m, loads, KENT_CASE_STATIC, NO_MARCH);
    const kent_instant i =
        kent_instant_at_rest(m, f, fitting_static_pressure(m, f), -1);
    case_name(m, c, "static");
    case_fill(c, &i);
}

static void loads_add_steady(const kent_recorder *r, size_t state,
                             const kent_fitting *f, kent_fitting_loads *loads)
{
    const kent_steady *s = r->steadies[state];
    const kent_model *m = s->model;
    kent_load_case *c =
        loads_add(m, loads, KENT_CASE_STEADY, (kent_march){-1, (int)state});
    kent_frame frame = {.time = NAN};

    for (size_t i = 0; i < f->port_count; i++) {
        const kent_port *port = &m->ports[f->port_first + i];
        frame.head[i] = kent_steady_head(m, s, port->span, port->chainage);
        frame.flow[i] = port->sign * s->span_flow[port->span];
    }
    const kent_instant i = kent_instant_of_frame(m, f, &frame);
    case_name(m, c, "steady");
    case_fill(c, &i);
}

static kent_case_kind scenario_kind(const kent_scenario *s)
{
    switch (s->class_of) {
    case KENT_RECURRING:
        return KENT_CASE_RECURRING;
    case KENT_OCCASIONAL:
        return KENT_CASE_OCCASIONAL;
    case KENT_EXCEPTIONAL:
        break;
    }
    return KENT_CASE_EXCEPTIONAL;
}

static void loads_add_march(const kent_recorder *r, size_t fitting, size_t index,
                            kent_fitting_loads *loads)
{
    const kent_march march = r->model->marches[index];
    const kent_model *m = r->steadies[march.state]->model;
    const kent_slot *slot = &r->slots[index];
    const kent_seen *seen = &slot->seen[fitting];
    const kent_fitting *f = &m->fittings[fitting];
    const kent_scenario *scenario = &m->scenarios[march.scenario];
    kent_load_case *c = loads_add(m, loads, scenario_kind(scenario), march);

    case_name(m, c, scenario->id);
    if (seen->best[KENT_RESULTANT] < 0.0) return; /* not one instant was taken */
    for (int k = 0; k < KENT_SENSES; k++) {
        if (!(seen->best[k] > 0.0) && k != KENT_RESULTANT) continue;
        const kent_instant i = kent_instant_of_frame(m, f, &seen->frame[k]);
        if (kent_instant_has_sense(&i, (kent_sense)k)) c->worst[k] = i;
    }
    c->lowest = kent_instant_of_frame(m, f, &seen->frame_lowest);
    c->highest = kent_instant_of_frame(m, f, &seen->frame_highest);
    c->above_90_percent = kent_seen_above_90_percent(seen, slot->step);
    c->step = slot->step;
}

/* What presses on one side of a shut valve. */
typedef struct kent_press {
    kent_case_kind kind;
    double pressure, time; /* Pa; s, NAN outside scenarios */
    kent_march march;      /* -1, -1: none */
} kent_press;

/* Keeps the one that asks for more: with factors of their own the higher pressure need
 * not be it. */
static void press_take(const kent_model *m, kent_press *most, kent_press p)
{
    const double asks = kind_factor(m, p.kind) * p.pressure;
    if (asks > kind_factor(m, most->kind) * most->pressure) *most = p;
}

/* A valve shut with the most that can press on one side and nothing behind (9.4). */
static void loads_add_closed(const kent_recorder *r, size_t fitting, size_t side,
                             kent_fitting_loads *loads)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[fitting];
    const int toward = m->ports[f->port_first + side].toward;
    const kent_press at_rest = {KENT_CASE_STATIC, fitting_static_pressure(m, f), NAN,
                                NO_MARCH};
    kent_press most = at_rest;
    char name[sizeof((kent_load_case *)NULL)->name];

    if (!isnan(m->loads.test_pressure)) {
        most = (kent_press){KENT_CASE_TEST, fitting_test_pressure(m, f), NAN, NO_MARCH};
        press_take(m, &most, at_rest);
    }
    for (size_t i = 0; i < m->march_count; i++) {
        if (!r->slots[i].started) continue;
        const kent_seen *seen = &r->slots[i].seen[fitting];
        const kent_press peak = {
            scenario_kind(&m->scenarios[m->marches[i].scenario]),
            kent_model_pressure(m, seen->highest_head[side], f->at.z),
            seen->highest_at[side], m->marches[i]};
        press_take(m, &most, peak);
    }
    kent_load_case *c = loads_add(m, loads, most.kind, most.march);
    kent_instant i = kent_instant_at_rest(m, f, most.pressure, (int)side);
    i.time = most.time;
    c->closed = true;
    c->pressed = side;
    (void)snprintf(name, sizeof name, "closed from %s",
                   m->points[toward >= 0 ? toward : f->point].id);
    case_name(m, c, name);
    case_fill(c, &i);
}

/* ---- all of them ----------------------------------------------------------------- */

static int loads_of_fitting(const kent_recorder *r, size_t index,
                            kent_fitting_loads *loads)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[index];

    loads->cases = kent_alloc(2 + m->state_count + m->march_count + KENT_PORTS,
                              sizeof *loads->cases);
    if (!loads->cases) return -1;
    if (!kent_fitting_in_network(f)) {
        kent_load_case *c = loads_add(m, loads, KENT_CASE_STEADY, NO_MARCH);
        const kent_instant i = kent_instant_given(m, f);
        c->given = true;
        case_name(m, c, "given");
        case_fill(c, &i);
        return 0;
    }
    loads_add_at_rest(m, f, loads);
    for (size_t s = 0; s < m->state_count; s++) {
        loads_add_steady(r, s, f, loads);
    }
    for (size_t i = 0; i < m->march_count; i++) {
        if (r->slots[i].started) loads_add_march(r, index, i, loads);
    }
    for (size_t i = 0; i < f->port_count && f->type == KENT_VALVE; i++) {
        loads_add_closed(r, index, i, loads);
    }
    return 0;
}

kent_status kent_recorder_finish(const kent_recorder *r, kent_loads_result **out,
                                 kent_error *err)
{
    const size_t count = r->model->fitting_count;
    kent_status status = KENT_E_NOMEM;
    kent_loads_result *loads = kent_alloc(1, sizeof *loads);

    if (!loads) goto done;
    loads->fittings = kent_alloc(count, sizeof *loads->fittings);
    if (!loads->fittings) goto done;
    loads->fitting_count = count;
    for (size_t i = 0; i < r->model->march_count; i++) {
        if (r->slots[i].failed) goto done;
    }
    for (size_t i = 0; i < count; i++) {
        if (loads_of_fitting(r, i, &loads->fittings[i])) goto done;
    }
    *out = loads;
    loads = NULL; /* handed over */
    status = KENT_OK;
done:
    kent_loads_free(loads);
    return status ? kent_error_nomem(err) : KENT_OK;
}

void kent_loads_free(kent_loads_result *l)
{
    if (!l) return;
    for (size_t i = 0; i < l->fitting_count; i++) {
        free(l->fittings[i].cases);
    }
    free(l->fittings);
    free(l);
}
