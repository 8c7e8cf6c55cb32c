#include "kent_recorder_internal.h"
#include "kent_sheet_internal.h"

#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double STANDARD_GRAVITY = 9.80665; /* m/s2 */

kent_words kent_say(const char *fmt, ...)
{
    kent_words w;
    va_list args;

    va_start(args, fmt);
    (void)vsnprintf(w.s, sizeof w.s, fmt, args);
    va_end(args);
    return w;
}

static void words_add(kent_words *w, const kent_words *more)
{
    const size_t used = strlen(w->s);
    (void)snprintf(w->s + used, sizeof w->s - used, "%s", more->s);
}

void kent_sheet_heading(const kent_sheet *s, kent_words w)
{
    kent_derivation_heading(s->d, w.s);
}

void kent_sheet_put(const kent_sheet *s, kent_words symbol, double value,
                    kent_kind kind, kent_source source, const char *says)
{
    kent_derivation_put(s->d, symbol.s, value, kind, source, says);
}

void kent_sheet_work(const kent_sheet *s, kent_words symbol, double value,
                     kent_kind kind, kent_words formula, const char *equation,
                     const char *says)
{
    kent_derivation_work(s->d, symbol.s, value, kind, formula.s, equation, says);
}

/* A direction cosine that is only rounding is printed as nil. */
static double cosine(double n) { return fabs(n) < 1e-12 ? 0.0 : n; }

/* ---- water and pressure at the centre -------------------------------------------- */

static void sheet_water(const kent_sheet *s)
{
    const kent_model *m = s->model;

    kent_derivation_put(s->d, "rho", m->water.density, KENT_DENSITY, KENT_COMPUTED,
                        "density of the water");
    if (s->load->given) return;
    kent_derivation_put(s->d, "g", m->gravity, KENT_ACCELERATION,
                        m->gravity == STANDARD_GRAVITY ? KENT_ASSUMED : KENT_GIVEN,
                        "gravity");
    kent_derivation_put(s->d, "z", s->fitting->at.z, KENT_LENGTH, KENT_GIVEN,
                        "level of the fitting's centre");
}

/* m: the head that a pressure at the fitting's centre means. */
static double sheet_head(const kent_sheet *s, double pressure)
{
    const kent_model *m = s->model;
    return pressure / (m->water.density * m->gravity) + s->fitting->at.z;
}

/* Whether a case is of one instant of moving water, each port with its own head. */
static bool of_heads(const kent_load_case *c)
{
    return !c->given && !c->closed && !c->emptied && !c->extended &&
           (c->scenario >= 0 || c->kind == KENT_CASE_STEADY);
}

void kent_loads_derive_later(const kent_model *m, const kent_fitting *f,
                             kent_derivation *d)
{
    const int gauge = m->loads.future_gauge;

    kent_derivation_put(d, "p_later", m->loads.future_pressure, KENT_PRESSURE,
                        KENT_GIVEN, "pressure expected later at its gauge");
    kent_derivation_put(d, "z_later", gauge >= 0 ? m->points[gauge].at.z : f->at.z,
                        KENT_LENGTH, gauge >= 0 ? KENT_GIVEN : KENT_ASSUMED,
                        "level of that gauge");
}

/* Where the pressure of a case comes from, as a head or as a gauge. */
static void sheet_pressure(const kent_sheet *s, const char *symbol, double pressure)
{
    const kent_model *m = s->model;
    const kent_load_case *c = s->load;

    if (c->scenario >= 0 || c->kind == KENT_CASE_STEADY) {
        kent_derivation_put(s->d, "H", sheet_head(s, pressure), KENT_LENGTH,
                            KENT_COMPUTED,
                            c->scenario >= 0 ? "head at that instant of the surge"
                                             : "head of the steady state");
        kent_derivation_work(s->d, symbol, pressure, KENT_PRESSURE, "rho*g*(H-z)",
                             "9.3", "pressure at the fitting's centre");
    } else if (c->kind == KENT_CASE_TEST) {
        const kent_site_test stated = {.pressure = m->loads.test_pressure,
                                       .gauge = m->loads.test_gauge};
        kent_site_test_derive(m, c->test ? c->test : &stated, s->fitting->at.z, s->d);
        kent_derivation_work(s->d, symbol, pressure, KENT_PRESSURE,
                             "p_test+rho*g*(z_gauge-z)", "9.1",
                             "test pressure at the fitting's centre");
    } else if (c->later) {
        kent_loads_derive_later(m, s->fitting, s->d);
        kent_derivation_work(s->d, symbol, pressure, KENT_PRESSURE,
                             "p_later+rho*g*(z_later-z)", "9.12",
                             "later pressure at the fitting's centre");
    } else if (c->kind == KENT_CASE_SHUT_OFF) {
        kent_derivation_put(s->d, "level", sheet_head(s, pressure), KENT_LENGTH,
                            KENT_COMPUTED,
                            "level that pumps raise the water to at no flow");
        kent_derivation_work(s->d, symbol, pressure, KENT_PRESSURE, "rho*g*(level-z)",
                             "9.15", "pressure at the fitting's centre");
    } else {
        kent_derivation_put(
            s->d, "level", sheet_head(s, pressure), KENT_LENGTH, KENT_GIVEN,
            isnan(m->loads.static_level) ? "highest level connected, every valve open"
                                         : "static level stated");
        kent_derivation_work(s->d, symbol, pressure, KENT_PRESSURE, "rho*g*(level-z)",
                             "9.2", "static pressure at the fitting's centre");
    }
}

/* ---- ports ----------------------------------------------------------------------- */

/* Whether the sizes of a port are those of a pipe class. */
static bool port_catalogued(const kent_sheet *s, const kent_port *port)
{
    const kent_model *m = s->model;
    return port->span >= 0 && m->pipes[m->spans[port->span].pipe].pipe_class[0] != '\0';
}

static bool is_outlet(const kent_port *port) { return port->kind == KENT_PORT_OUTLET; }

static void sheet_port_heading(const kent_sheet *s, size_t i)
{
    const kent_port *port = &s->ports[i];
    const size_t n = i + 1;

    if (s->load->extended && (i == s->fitting->port_count || is_outlet(port))) {
        kent_sheet_heading(s, kent_say("Port %zu, the branch once it is extended", n));
    } else if (port->kind == KENT_PORT_STUB) {
        kent_sheet_heading(s, kent_say("Port %zu, the dead branch", n));
    } else if (is_outlet(port)) {
        kent_sheet_heading(s, kent_say("Port %zu, open to the air", n));
    } else if (port->toward >= 0) {
        kent_sheet_heading(
            s, kent_say("Port %zu, towards %s", n, s->model->points[port->toward].id));
    } else {
        kent_sheet_heading(s, kent_say("Port %zu", n));
    }
}

static const char *seal_says(const kent_sheet *s, const kent_port *port)
{
    const bool outside = port->seal_diameter == port->outside_diameter &&
                         port->seal_diameter > port->inside_diameter;

    if (outside) {
        return "outside diameter: the pressure acts on it where a joint slips";
    }
    switch (s->model->loads.thrust_area) {
    case KENT_AREA_OUTSIDE:
        break;
    case KENT_AREA_INSIDE:
        return "bore: on it the pressure acts, as thrust_area says";
    case KENT_AREA_NOMINAL:
        return "nominal size: on it the pressure acts, as thrust_area says";
    }
    return "diameter that the pressure acts on";
}

/* Whether the area depends on the diameter chosen. */
static bool has_gap(const kent_port *port)
{
    return port->outside_diameter > port->inside_diameter;
}

static bool same_gap(const kent_port *a, const kent_port *b)
{
    return a->outside_diameter == b->outside_diameter &&
           a->inside_diameter == b->inside_diameter;
}

static void sheet_geometry(const kent_sheet *s, size_t i)
{
    const kent_port *port = &s->ports[i];
    const size_t n = i + 1;
    const double area = 0.25 * PI * port->seal_diameter * port->seal_diameter;
    const bool catalogued = port_catalogued(s, port);

    sheet_port_heading(s, i);
    kent_sheet_put(s, kent_say("n_%zux", n), cosine(port->direction.x), KENT_RATIO,
                   s->geometry, "outward direction, east");
    kent_sheet_put(s, kent_say("n_%zuy", n), cosine(port->direction.y), KENT_RATIO,
                   s->geometry, "outward direction, north");
    kent_sheet_put(s, kent_say("n_%zuz", n), cosine(port->direction.z), KENT_RATIO,
                   s->geometry, "outward direction, up");
    kent_sheet_put(s, kent_say("D_%zu", n), port->seal_diameter, KENT_DIAMETER,
                   catalogued ? KENT_CATALOGUE : KENT_GIVEN, seal_says(s, port));
    kent_sheet_work(s, kent_say("A_%zu", n), area, KENT_AREA,
                    kent_say("pi/4*D_%zu^2", n), "8.2",
                    "area that the pressure acts on");
    if (!has_gap(port) || (i > 0 && same_gap(port, &s->ports[i - 1]))) return;
    const double ratio = port->outside_diameter / port->inside_diameter;
    kent_sheet_put(s, kent_say("more_%zu", n), ratio * ratio - 1.0, KENT_RATIO,
                   KENT_COMPUTED,
                   "share by which the area on the outside diameter is more than the "
                   "bore's");
}

/* What an open end passes on: all that the others bring. It may stand before them. */
static void sheet_outflow(const kent_sheet *s, size_t i)
{
    const kent_port_state *state = s->instant->balance.port;
    kent_words formula = kent_say("-(");
    bool known = true;

    for (size_t k = 0, terms = 0; k < s->count; k++) {
        if (s->ports[k].kind != KENT_PORT_SPAN) continue;
        const kent_words term = kent_say("%sQ_%zu", terms++ ? "+" : "", k + 1);
        words_add(&formula, &term);
        known = known && k < i;
    }
    const kent_words close = kent_say(")"), symbol = kent_say("Q_%zu", i + 1);
    words_add(&formula, &close);
    if (known) {
        kent_sheet_work(s, symbol, state[i].flow, KENT_FLOW, formula, "8.13",
                        "drawn here");
    } else {
        kent_sheet_put(s, symbol, state[i].flow, KENT_FLOW, KENT_COMPUTED,
                       "drawn here (8.13)");
    }
}

static void sheet_stream(const kent_sheet *s, size_t i)
{
    const kent_port *port = &s->ports[i];
    const kent_port_state *state = &s->instant->balance.port[i];
    const size_t n = i + 1;
    const double bore = 0.25 * PI * port->inside_diameter * port->inside_diameter;

    if (!s->moving) {
        kent_sheet_put(s, kent_say("Q_%zu", n), 0.0, KENT_FLOW,
                       s->load->given ? KENT_GIVEN : KENT_COMPUTED, "no flow");
        return;
    }
    kent_sheet_put(s, kent_say("d_%zu", n), port->inside_diameter, KENT_DIAMETER,
                   port_catalogued(s, port) ? KENT_CATALOGUE : KENT_GIVEN,
                   "bore of the stream");
    kent_sheet_work(s, kent_say("a_%zu", n), bore, KENT_AREA,
                    kent_say("pi/4*d_%zu^2", n), "8.2", "area of the stream");
    if (is_outlet(port)) {
        sheet_outflow(s, i);
    } else {
        kent_sheet_put(s, kent_say("Q_%zu", n), state->flow, KENT_FLOW,
                       s->load->given ? KENT_GIVEN : KENT_COMPUTED,
                       port->kind == KENT_PORT_STUB ? "no flow in a dead branch"
                                                    : "flow out of the fitting");
    }
    kent_sheet_work(s, kent_say("V_%zu", n), state->flow / bore, KENT_SPEED,
                    kent_say("Q_%zu/a_%zu", n, n), "8.3",
                    "velocity out of the fitting");
    kent_sheet_put(s, kent_say("beta_%zu", n), state->momentum_factor, KENT_RATIO,
                   isnan(port->momentum_factor) ? KENT_COMPUTED : KENT_GIVEN,
                   "momentum factor of the velocity profile (8.6)");
}

/* Pa that a port gains over the reference port for its lesser velocity (8.3). */
static double velocity_gain(const kent_sheet *s, size_t i)
{
    double speed[2]; /* m/s: of the reference port, of this one */
    const size_t at[2] = {s->widest, i};

    for (size_t k = 0; k < 2; k++) {
        const double bore = s->ports[at[k]].inside_diameter;
        speed[k] = s->instant->balance.port[at[k]].flow / (0.25 * PI * bore * bore);
    }
    return 0.5 * s->model->water.density * (speed[0] * speed[0] - speed[1] * speed[1]);
}

/* A port of a group, at a level of its own: by its head, or by still water. */
static void sheet_own_level(const kent_sheet *s, size_t i)
{
    const kent_model *m = s->model;
    const size_t n = i + 1, w = s->widest + 1;
    const double weight = m->water.density * m->gravity;
    const double z = s->ports[i].level;
    const double pressure = s->instant->balance.port[i].pressure;

    kent_sheet_put(s, kent_say("z_%zu", n), z, KENT_LENGTH, KENT_GIVEN,
                   "level of this port");
    if (!of_heads(s->load)) {
        kent_sheet_work(s, kent_say("p_%zu", n), pressure, KENT_PRESSURE,
                        kent_say("p+rho*g*(z-z_%zu)", n), "8.14",
                        "gauge pressure at the port");
        return;
    }
    const double gain = s->moving && i != s->widest ? velocity_gain(s, i) : 0.0;
    kent_sheet_put(s, kent_say("H_%zu", n), (pressure - gain) / weight + z, KENT_LENGTH,
                   KENT_COMPUTED, "head at this port");
    kent_sheet_work(
        s, kent_say("p_%zu", n), pressure, KENT_PRESSURE,
        s->moving && i != s->widest
            ? kent_say("rho*g*(H_%zu-z_%zu)+rho/2*(V_%zu^2-V_%zu^2)", n, n, w, n)
            : kent_say("rho*g*(H_%zu-z_%zu)", n, n),
        "8.14", "gauge pressure at the port");
}

/* Behind a closed valve, or a leg that is shut. */
static bool is_dry(const kent_load_case *c, size_t i)
{
    return (c->closed && i != c->pressed) || (c->emptied && i == c->dry);
}

static void sheet_port_pressure(const kent_sheet *s, size_t i)
{
    const size_t n = i + 1, w = s->widest + 1;
    const double pressure = s->instant->balance.port[i].pressure;
    const kent_words symbol = kent_say("p_%zu", n);

    if (s->load->given) {
        kent_sheet_put(s, symbol, pressure, KENT_PRESSURE, KENT_GIVEN,
                       "gauge pressure");
    } else if (is_outlet(&s->ports[i]) && !s->load->extended) {
        kent_sheet_put(s, symbol, 0.0, KENT_PRESSURE, KENT_COMPUTED,
                       "open to the air: no gauge pressure");
    } else if (is_dry(s->load, i)) {
        kent_sheet_put(s, symbol, 0.0, KENT_PRESSURE, KENT_ASSUMED,
                       s->load->closed ? "nothing behind the closed valve"
                                       : "this leg is shut and empty");
    } else if (s->fitting->type == KENT_VALVE ||
               (s->load->closed && isnan(s->ports[i].level))) {
        sheet_pressure(s, symbol.s, pressure);
    } else if (!isnan(s->ports[i].level)) {
        sheet_own_level(s, i);
    } else if (!s->moving || i == s->widest) {
        kent_sheet_work(s, symbol, pressure, KENT_PRESSURE, kent_say("p"), "8.3",
                        "gauge pressure at the port");
    } else {
        kent_sheet_work(s, symbol, pressure, KENT_PRESSURE,
                        kent_say("p+rho/2*(V_%zu^2-V_%zu^2)", w, n), "8.3",
                        "gauge pressure at the port");
    }
}

static void sheet_push(const kent_sheet *s, size_t i)
{
    const kent_port_state *state = &s->instant->balance.port[i];
    const size_t n = i + 1;

    sheet_port_pressure(s, i);
    kent_sheet_work(s, kent_say("P_%zu", n), state->pressure_force, KENT_FORCE,
                    kent_say("p_%zu*A_%zu", n, n), "8.4", "pressure force");
    if (s->moving) {
        kent_sheet_work(s, kent_say("J_%zu", n), state->momentum_flux, KENT_FORCE,
                        kent_say("beta_%zu*rho*Q_%zu*V_%zu", n, n, n), "8.5",
                        "momentum flux, the same for flow either way");
    } else {
        kent_sheet_put(s, kent_say("J_%zu", n), 0.0, KENT_FORCE, KENT_COMPUTED,
                       "momentum flux: no stream");
    }
    kent_sheet_work(s, kent_say("F_%zu", n), state->push, KENT_FORCE,
                    kent_say("P_%zu+J_%zu", n, n), "8.1",
                    "push, against the outward direction");
}

/* ---- sum ------------------------------------------------------------------------- */

static double component(kent_vec3 v, char axis)
{
    return axis == 'x' ? v.x : axis == 'y' ? v.y : v.z;
}

/* The water's inertia in the legs: nil where no face distance is given. */
static void sheet_unsteady(const kent_sheet *s)
{
    const kent_balance *b = &s->instant->balance;
    bool changing = false;

    for (size_t i = 0; i < s->count; i++) {
        const kent_port *port = &s->ports[i];
        const size_t n = i + 1;
        const double bore = 0.25 * PI * port->inside_diameter * port->inside_diameter;
        if (b->port[i].flow_rate == 0.0 || !(port->face > 0.0)) continue;
        changing = true;
        kent_sheet_put(s, kent_say("r_%zu", n), port->face, KENT_LENGTH, KENT_GIVEN,
                       "from the centre to the port");
        kent_sheet_put(s, kent_say("w_%zu", n), b->port[i].flow_rate / bore,
                       KENT_ACCELERATION, KENT_COMPUTED, "dV/dt of the stream (8.7)");
    }
    for (const char *axis = "xyz"; *axis != '\0'; axis++) {
        const kent_words symbol = kent_say("U_%c", *axis);
        kent_words formula = kent_say("-rho*(");
        if (!changing) {
            kent_sheet_put(s, symbol, 0.0, KENT_FORCE, KENT_COMPUTED,
                           "force of the changing flow: nil");
            continue;
        }
        for (size_t i = 0, terms = 0; i < s->count; i++) {
            const size_t n = i + 1;
            if (b->port[i].flow_rate == 0.0 || !(s->ports[i].face > 0.0)) continue;
            const kent_words term = kent_say("%sa_%zu*w_%zu*r_%zu*n_%zu%c",
                                             terms++ ? "+" : "", n, n, n, n, *axis);
            words_add(&formula, &term);
        }
        const kent_words close = kent_say(")");
        words_add(&formula, &close);
        kent_sheet_work(s, symbol, component(b->unsteady, *axis), KENT_FORCE, formula,
                        "8.7", "force of the changing flow, never what governs");
    }
}

static void sheet_sum(const kent_sheet *s)
{
    const kent_balance *b = &s->instant->balance;
    const kent_vec3 t = b->thrust;
    static const char *const TOWARDS[] = {"thrust of the water on the fitting, east",
                                          "the same, north", "the same, up"};

    kent_sheet_heading(s, kent_say("Sum"));
    for (const char *axis = "xy"; *axis != '\0'; axis++) {
        kent_sheet_put(s, kent_say("W_%c", *axis), 0.0, KENT_FORCE, KENT_COMPUTED,
                       "weight acts downwards alone");
    }
    kent_sheet_put(s, kent_say("W_z"), b->weight.z, KENT_FORCE,
                   s->fitting->weight > 0.0 ? KENT_GIVEN : KENT_ASSUMED,
                   s->fitting->weight > 0.0
                       ? "weight of the fitting and its water"
                       : "weight of the fitting and its water: left "
                         "out unless stated");
    sheet_unsteady(s);
    for (size_t k = 0; k < 3; k++) {
        const char axis = "xyz"[k];
        kent_words formula = kent_say("-(");
        for (size_t i = 0; i < s->count; i++) {
            const kent_words term =
                kent_say("%sF_%zu*n_%zu%c", i > 0 ? "+" : "", i + 1, i + 1, axis);
            words_add(&formula, &term);
        }
        const kent_words close = kent_say(")+W_%c+U_%c", axis, axis);
        words_add(&formula, &close);
        kent_sheet_work(s, kent_say("T_%c", axis), component(t, axis), KENT_FORCE,
                        formula, "8.1", TOWARDS[k]);
    }
    kent_derivation_work(s->d, "T_h", kent_thrust_horizontal(t), KENT_FORCE,
                         "sqrt(T_x^2+T_y^2)", "8.8", "sideways thrust");
    kent_derivation_work(s->d, "T", kent_vec3_length(t), KENT_FORCE,
                         "sqrt(T_x^2+T_y^2+T_z^2)", "8.8", "resultant thrust");
}

/* ---- the whole --------------------------------------------------------------------
 */

/* Whether every port has its own level, so that none has the centre's pressure. */
static bool sheet_has_levels(const kent_sheet *s)
{
    for (size_t i = 0; i < s->count; i++) {
        if (!is_outlet(&s->ports[i]) && isnan(s->ports[i].level)) return false;
    }
    return true;
}

static void sheet_title(const kent_sheet *s, kent_sense sense)
{
    static const char *const WORST[KENT_SENSES] = {
        "largest resultant", "largest sideways thrust", "largest upward thrust",
        "largest downward thrust"};

    if (!s->instant->set) {
        kent_sheet_heading(
            s, kent_say("Load case %s: no %s", s->load->name, WORST[sense]));
    } else if (isnan(s->instant->time)) {
        kent_sheet_heading(s,
                           kent_say("Load case %s: %s", s->load->name, WORST[sense]));
    } else {
        kent_sheet_heading(s, kent_say("Load case %s: %s, at %.2f s", s->load->name,
                                       WORST[sense], s->instant->time));
    }
}

void kent_loads_derive(const kent_model *m, const kent_fitting *fitting,
                       const kent_load_case *load, kent_sense sense, kent_derivation *d)
{
    const kent_instant *instant = &load->worst[sense];
    kent_sheet s = {
        .model = m,
        .fitting = fitting,
        .load = load,
        .instant = instant,
        .geometry = kent_fitting_in_network(fitting) ? KENT_COMPUTED : KENT_GIVEN,
        .d = d,
    };

    sheet_title(&s, sense);
    if (!instant->set) return;
    s.count = kent_load_case_ports(m, fitting, load, s.ports);
    s.widest = kent_port_widest(s.ports, s.count);
    for (size_t i = 0; i < s.count; i++) {
        if (instant->balance.port[i].flow != 0.0) s.moving = true;
    }
    sheet_water(&s);
    const bool centre = !load->closed || fitting->type == KENT_GROUP;
    if (!load->given && centre && fitting->type != KENT_VALVE &&
        !(of_heads(load) && sheet_has_levels(&s))) {
        sheet_pressure(&s, "p", instant->pressure);
    }
    for (size_t i = 0; i < s.count; i++) {
        sheet_geometry(&s, i);
        sheet_stream(&s, i);
    }
    kent_sheet_heading(
        &s, kent_say(s.count > 1 ? "Push of each port" : "Push of the port"));
    for (size_t i = 0; i < s.count; i++) {
        sheet_push(&s, i);
    }
    sheet_sum(&s);
    kent_sheet_check(&s);
}
