#include "kent_press_internal.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double PI = 3.14159265358979323846;

double kent_thrust_horizontal(kent_vec3 thrust) { return hypot(thrust.x, thrust.y); }

double kent_thrust_azimuth(kent_vec3 thrust)
{
    const double azimuth = atan2(thrust.x, thrust.y);

    return azimuth < 0.0 ? azimuth + 2.0 * PI : azimuth;
}

/* ---- one case -------------------------------------------------------------------- */

static const kent_march NO_MARCH = {-1, -1};

static kent_load_case *loads_add(const kent_model *m, kent_fitting_loads *loads,
                                 kent_case_kind kind, kent_march march)
{
    kent_load_case *c = &loads->cases[loads->count++];

    *c = (kent_load_case){
        .kind = kind,
        .scenario = march.scenario,
        .state = march.state,
        .safety_factor = kent_press_factor(m, kind),
        .increase = m->loads.bearing_increase[kind],
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

/* A case of still water under one pressure; NAN: there is none. */
static void loads_add_at_rest(const kent_model *m, const kent_fitting *f,
                              const char *name, kent_case_kind kind, double pressure,
                              kent_fitting_loads *loads)
{
    if (isnan(pressure)) return;
    kent_load_case *c = loads_add(m, loads, kind, NO_MARCH);
    const kent_instant i = kent_instant_at_rest(m, f, pressure, -1);
    c->later = strcmp(name, "future") == 0;
    case_name(m, c, name);
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
        if (port->kind != KENT_PORT_SPAN) continue;
        frame.head[i] = kent_steady_head(m, s, port->span, port->chainage);
        frame.flow[i] = port->sign * s->span_flow[port->span];
    }
    kent_frame_complete(m, f, &frame);
    const kent_instant i = kent_instant_of_frame(m, f, &frame);
    case_name(m, c, "steady");
    case_fill(c, &i);
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
    kent_load_case *c = loads_add(m, loads, kent_press_kind_of(scenario), march);

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

/* A case of something shut, pressed by what asks for most there. */
static kent_load_case *loads_add_pressed(const kent_model *m, kent_fitting_loads *loads,
                                         const kent_press *most, const char *name)
{
    kent_load_case *c = loads_add(m, loads, most->kind, most->march);

    c->later = most->later;
    case_name(m, c, name);
    return c;
}

/* The march with the lowest head at a fitting; march_count: none was run. */
static size_t lowest_march(const kent_recorder *r, size_t fitting)
{
    size_t lowest = r->model->march_count;
    double head = INFINITY;

    for (size_t i = 0; i < r->model->march_count; i++) {
        if (!kent_recorder_counts(r, i)) continue;
        if (!(r->slots[i].seen[fitting].lowest < head)) continue;
        head = r->slots[i].seen[fitting].lowest;
        lowest = i;
    }
    return lowest;
}

/* The lowest pressure of all marches, where it is suction, with the flows of that
 * instant (9.17). */
static void loads_add_suction(const kent_recorder *r, size_t fitting,
                              kent_fitting_loads *loads)
{
    const size_t index = lowest_march(r, fitting);

    if (index == r->model->march_count) return;
    const kent_march march = r->model->marches[index];
    const kent_model *m = r->steadies[march.state]->model;
    const kent_seen *seen = &r->slots[index].seen[fitting];
    const kent_fitting *f = &m->fittings[fitting];
    const kent_instant i = kent_instant_of_frame(m, f, &seen->frame_lowest);
    if (!(kent_model_pressure(m, seen->lowest, f->at.z) < 0.0)) return;
    kent_load_case *c = loads_add(m, loads, KENT_CASE_SUCTION, march);
    case_name(m, c, "suction");
    c->lowest = c->highest = i;
    case_fill(c, &i);
}

/* "closed from R1", by the next point of a leg. */
static kent_load_case *loads_add_shut(const kent_model *m, const kent_fitting *f,
                                      size_t port, const char *way,
                                      const kent_press *most, kent_fitting_loads *loads)
{
    const int toward = m->ports[f->port_first + port].toward;
    char name[sizeof((kent_load_case *)NULL)->name];

    (void)snprintf(name, sizeof name, "closed %s %s", way,
                   m->points[toward >= 0 ? toward : f->point].id);
    return loads_add_pressed(m, loads, most, name);
}

/* Of what asks for the most of soil and in full: how many cases they are. Where soil
 * may bear more in some, what governs a face need not govern joints or a weight. */
static size_t press_count(const kent_press most[2])
{
    const bool same =
        most[0].kind == most[1].kind && most[0].pressure == most[1].pressure;
    return isnan(most[0].pressure) ? 0 : same ? 1 : 2;
}

/* A valve or leg shut with the most that can press on one side and nothing behind (9.4,
 * 9.16). */
static void loads_add_closed_by(const kent_model *m, const kent_press *most,
                                const kent_fitting *f, size_t side,
                                kent_fitting_loads *loads)
{
    kent_instant i = kent_instant_at_rest(m, f, most->pressure, (int)side);
    kent_load_case *c = loads_add_shut(m, f, side, "from", most, loads);

    i.time = most->time;
    c->closed = true;
    c->pressed = side;
    case_fill(c, &i);
}

static void loads_add_closed(const kent_recorder *r, const kent_site_test *test,
                             size_t fitting, size_t side, kent_fitting_loads *loads)
{
    const kent_press most[] = {kent_press_most(r, test, fitting, side, false, false),
                               kent_press_most(r, test, fitting, side, false, true)};

    for (size_t i = 0; i < press_count(most); i++) {
        loads_add_closed_by(r->model, &most[i], &r->model->fittings[fitting], side,
                            loads);
    }
}

/* Of all legs but one, what asks for most. */
static kent_press press_beside(const kent_recorder *r, const kent_site_test *test,
                               size_t fitting, size_t dry, bool in_full)
{
    const kent_fitting *f = &r->model->fittings[fitting];
    kent_press most = {.pressure = NAN, .in_full = in_full};

    for (size_t k = 0; k < f->port_count; k++) {
        if (k == dry || r->model->ports[f->port_first + k].kind != KENT_PORT_SPAN) {
            continue;
        }
        kent_press_take(r->model, &most,
                        kent_press_most(r, test, fitting, k, false, in_full));
    }
    return most;
}

/* A leg shut and emptied, with the most that can press on all the others (9.16); none
 * where no other leg is a pipe. */
static void loads_add_emptied(const kent_recorder *r, const kent_site_test *test,
                              size_t fitting, size_t dry, kent_fitting_loads *loads)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[fitting];
    const kent_press most[] = {press_beside(r, test, fitting, dry, false),
                               press_beside(r, test, fitting, dry, true)};

    for (size_t i = 0; i < press_count(most); i++) {
        kent_instant at = kent_instant_emptied(m, f, most[i].pressure, dry);
        kent_load_case *c = loads_add_shut(m, f, dry, "to", &most[i], loads);
        at.time = most[i].time;
        c->emptied = true;
        c->dry = dry;
        case_fill(c, &at);
    }
}

/* Each leg that can be shut: under pressure alone, where something behind it presses,
 * and empty beside the others. */
static int loads_add_legs(const kent_recorder *r, const kent_site_test *test,
                          size_t index, kent_fitting_loads *loads)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[index];
    bool supplied[KENT_PORTS] = {false};

    if (!kent_fitting_has_shut_legs(m, f)) return 0;
    if (kent_ports_supplied(m, f, supplied)) return -1;
    for (size_t i = 0; i < f->port_count; i++) {
        if (!kent_port_shuts(m, f, i)) continue;
        if (supplied[i]) loads_add_closed(r, test, index, i, loads);
        loads_add_emptied(r, test, index, i, loads);
    }
    return 0;
}

/* Whether a pipe may be joined to a branch that pushes nothing as built: its end is no
 * port, or an open one that may be shut. At a pipe's end a bolted hydrant is the end.
 */
static bool may_be_extended(const kent_model *m, const kent_fitting *f)
{
    bool outlet = false;

    if (f->branch.end == KENT_BRANCH_NONE) return false;
    for (size_t i = 0; i < f->port_count; i++) {
        const kent_port *port = &m->ports[f->port_first + i];
        if (port->kind == KENT_PORT_STUB) return false;
        outlet = outlet || port->kind == KENT_PORT_OUTLET;
    }
    return !outlet || f->type != KENT_DEAD_END || kent_joint_slips(f->branch.joint);
}

/* The branch once a pipe is joined to it (9.13). */
static void loads_add_extended(const kent_recorder *r, const kent_site_test *test,
                               size_t fitting, kent_fitting_loads *loads)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[fitting];
    const size_t widest = kent_port_widest(&m->ports[f->port_first], f->port_count);
    const kent_press most[] = {kent_press_most(r, test, fitting, widest, true, false),
                               kent_press_most(r, test, fitting, widest, true, true)};

    for (size_t i = 0; i < press_count(most); i++) {
        kent_load_case *c = loads_add_pressed(m, loads, &most[i], "branch extended");
        c->extended = true;
        kent_instant at = kent_instant_extended(m, f, c, most[i].pressure);
        at.time = most[i].time;
        case_fill(c, &at);
    }
}

/* ---- all of them ----------------------------------------------------------------- */

static int loads_of_fitting(const kent_recorder *r, const kent_site_test *test,
                            size_t index, kent_fitting_loads *loads)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[index];
    const size_t most = 7 + m->state_count + m->march_count + 4 * (size_t)KENT_PORTS;

    loads->cases = kent_alloc(most, sizeof *loads->cases);
    if (!loads->cases) return -1;
    if (!kent_fitting_in_network(f)) {
        kent_load_case *c = loads_add(m, loads, KENT_CASE_STEADY, NO_MARCH);
        const kent_instant i = kent_instant_given(m, f);
        c->given = true;
        case_name(m, c, "given");
        case_fill(c, &i);
        return 0;
    }
    loads_add_at_rest(m, f, "test", KENT_CASE_TEST, kent_press_of_test(m, test, f),
                      loads);
    loads_add_at_rest(m, f, "static", KENT_CASE_STATIC, kent_press_static(m, f), loads);
    loads_add_at_rest(m, f, "shut-off", KENT_CASE_SHUT_OFF, kent_press_shut_off(m, f),
                      loads);
    for (size_t s = 0; s < m->state_count; s++) {
        loads_add_steady(r, s, f, loads);
    }
    loads_add_at_rest(m, f, "future", KENT_CASE_STATIC, kent_press_later(m, f), loads);
    for (size_t i = 0; i < m->march_count; i++) {
        if (kent_recorder_counts(r, i)) loads_add_march(r, index, i, loads);
    }
    loads_add_suction(r, index, loads);
    for (size_t i = 0; i < f->port_count && f->type == KENT_VALVE; i++) {
        if (kent_fitting_shuts(m, f, i)) loads_add_closed(r, test, index, i, loads);
    }
    if (loads_add_legs(r, test, index, loads)) return -1;
    if (may_be_extended(m, f)) loads_add_extended(r, test, index, loads);
    for (size_t i = 0; i < loads->count; i++) {
        loads->cases[i].test = test;
    }
    return 0;
}

static kent_site_test test_of(const kent_recorder *r, const kent_worst *surge)
{
    kent_site_test test = kent_site_test_find(r->model, r->steadies, surge);

    for (size_t k = 0; k < r->model->march_count; k++) {
        const bool aside =
            r->model->scenarios[r->model->marches[k].scenario].for_comparison;
        const bool missing = !r->slots[k].started && !aside;
        test.partial |= missing && test.rule == KENT_TEST_EN805_CALCULATED;
    }
    return test;
}

kent_status kent_recorder_finish(const kent_recorder *r, const kent_worst *surge,
                                 kent_loads_result **out, kent_error *err)
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
    loads->test = test_of(r, surge);
    for (size_t i = 0; i < count; i++) {
        if (loads_of_fitting(r, &loads->test, i, &loads->fittings[i])) goto done;
    }
    if (kent_along_finish(r, loads, err)) goto done;
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
    kent_runs_free(l->runs, l->run_count);
    kent_strings_clear(&l->strings);
    free(l->fittings);
    free(l);
}
