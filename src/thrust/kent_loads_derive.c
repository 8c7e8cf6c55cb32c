#include "kent_recorder_internal.h"

#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double STANDARD_GRAVITY = 9.80665; /* m/s2 */

/* One hand calculation being written. */
typedef struct sheet {
    const kent_model *model;
    const kent_fitting *fitting;
    const kent_port *ports; /* [count] */
    size_t count, widest;
    const kent_load_case *load;
    const kent_instant *instant;
    bool moving;          /* at least one port has a stream */
    kent_source geometry; /* where directions come from */
    kent_derivation *d;
} sheet;

/* A symbol or formula with a port's number in it: "p_2". */
typedef struct words {
    char s[160];
} words;

__attribute__((format(printf, 1, 2))) static words say(const char *fmt, ...)
{
    words w;
    va_list args;

    va_start(args, fmt);
    (void)vsnprintf(w.s, sizeof w.s, fmt, args);
    va_end(args);
    return w;
}

static void words_add(words *w, const words *more)
{
    const size_t used = strlen(w->s);
    (void)snprintf(w->s + used, sizeof w->s - used, "%s", more->s);
}

static void sheet_heading(const sheet *s, words w)
{
    kent_derivation_heading(s->d, w.s);
}

static void sheet_put(const sheet *s, words symbol, double value, kent_kind kind,
                      kent_source source, const char *says)
{
    kent_derivation_put(s->d, symbol.s, value, kind, source, says);
}

static void sheet_work(const sheet *s, words symbol, double value, kent_kind kind,
                       words formula, const char *equation, const char *says)
{
    kent_derivation_work(s->d, symbol.s, value, kind, formula.s, equation, says);
}

/* A direction cosine that is only rounding is printed as nil. */
static double cosine(double n) { return fabs(n) < 1e-12 ? 0.0 : n; }

/* ---- water and pressure at the centre -------------------------------------------- */

static void sheet_water(const sheet *s)
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
static double sheet_head(const sheet *s, double pressure)
{
    const kent_model *m = s->model;
    return pressure / (m->water.density * m->gravity) + s->fitting->at.z;
}

/* Where the pressure of a case comes from, as a head or as the test gauge. */
static void sheet_pressure(const sheet *s, const char *symbol, double pressure)
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
        const int gauge = m->loads.test_gauge;
        kent_derivation_put(s->d, "p_test", m->loads.test_pressure, KENT_PRESSURE,
                            KENT_GIVEN, "field test pressure at the gauge");
        kent_derivation_put(
            s->d, "z_gauge", gauge >= 0 ? m->points[gauge].at.z : s->fitting->at.z,
            KENT_LENGTH, gauge >= 0 ? KENT_GIVEN : KENT_ASSUMED, "level of the gauge");
        kent_derivation_work(s->d, symbol, pressure, KENT_PRESSURE,
                             "p_test+rho*g*(z_gauge-z)", "9.1",
                             "test pressure at the fitting's centre");
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
static bool port_catalogued(const sheet *s, const kent_port *port)
{
    const kent_model *m = s->model;
    return port->span >= 0 && m->pipes[m->spans[port->span].pipe].pipe_class[0] != '\0';
}

static void sheet_geometry(const sheet *s, size_t i)
{
    const kent_port *port = &s->ports[i];
    const size_t n = i + 1;
    const double area = 0.25 * PI * port->seal_diameter * port->seal_diameter;
    const kent_model *m = s->model;
    const bool catalogued = port_catalogued(s, port);

    if (port->toward >= 0) {
        sheet_heading(s, say("Port %zu, towards %s", n, m->points[port->toward].id));
    } else {
        sheet_heading(s, say("Port %zu", n));
    }
    sheet_put(s, say("n_%zux", n), cosine(port->direction.x), KENT_RATIO, s->geometry,
              "outward direction, east");
    sheet_put(s, say("n_%zuy", n), cosine(port->direction.y), KENT_RATIO, s->geometry,
              "outward direction, north");
    sheet_put(s, say("n_%zuz", n), cosine(port->direction.z), KENT_RATIO, s->geometry,
              "outward direction, up");
    sheet_put(s, say("D_%zu", n), port->seal_diameter, KENT_DIAMETER,
              catalogued ? KENT_CATALOGUE : KENT_GIVEN,
              port->seal_diameter > port->inside_diameter
                  ? "outside diameter: the pressure acts on it where a joint slips"
                  : "diameter that the pressure acts on");
    sheet_work(s, say("A_%zu", n), area, KENT_AREA, say("pi/4*D_%zu^2", n), "8.2",
               "area that the pressure acts on");
}

static void sheet_stream(const sheet *s, size_t i)
{
    const kent_port *port = &s->ports[i];
    const kent_port_state *state = &s->instant->balance.port[i];
    const size_t n = i + 1;
    const double bore = 0.25 * PI * port->inside_diameter * port->inside_diameter;

    if (!s->moving) {
        sheet_put(s, say("Q_%zu", n), 0.0, KENT_FLOW,
                  s->load->given ? KENT_GIVEN : KENT_COMPUTED, "no flow");
        return;
    }
    sheet_put(s, say("d_%zu", n), port->inside_diameter, KENT_DIAMETER,
              port_catalogued(s, port) ? KENT_CATALOGUE : KENT_GIVEN,
              "bore of the stream");
    sheet_work(s, say("a_%zu", n), bore, KENT_AREA, say("pi/4*d_%zu^2", n), "8.2",
               "area of the stream");
    sheet_put(s, say("Q_%zu", n), state->flow, KENT_FLOW,
              s->load->given ? KENT_GIVEN : KENT_COMPUTED, "flow out of the fitting");
    sheet_work(s, say("V_%zu", n), state->flow / bore, KENT_SPEED,
               say("Q_%zu/a_%zu", n, n), "8.3", "velocity out of the fitting");
    sheet_put(s, say("beta_%zu", n), state->momentum_factor, KENT_RATIO,
              isnan(port->momentum_factor) ? KENT_COMPUTED : KENT_GIVEN,
              "momentum factor of the velocity profile (8.6)");
}

static void sheet_port_pressure(const sheet *s, size_t i)
{
    const size_t n = i + 1, w = s->widest + 1;
    const double pressure = s->instant->balance.port[i].pressure;
    const words symbol = say("p_%zu", n);

    if (s->load->given) {
        sheet_put(s, symbol, pressure, KENT_PRESSURE, KENT_GIVEN, "gauge pressure");
    } else if (s->load->closed) {
        if (i == s->load->pressed) {
            sheet_pressure(s, symbol.s, pressure);
        } else {
            sheet_put(s, symbol, 0.0, KENT_PRESSURE, KENT_ASSUMED,
                      "nothing behind the closed valve");
        }
    } else if (s->fitting->type == KENT_VALVE) {
        sheet_pressure(s, symbol.s, pressure);
    } else if (!s->moving || i == s->widest) {
        sheet_work(s, symbol, pressure, KENT_PRESSURE, say("p"), "8.3",
                   "gauge pressure at the port");
    } else {
        sheet_work(s, symbol, pressure, KENT_PRESSURE,
                   say("p+rho/2*(V_%zu^2-V_%zu^2)", w, n), "8.3",
                   "gauge pressure at the port");
    }
}

static void sheet_push(const sheet *s, size_t i)
{
    const kent_port_state *state = &s->instant->balance.port[i];
    const size_t n = i + 1;

    sheet_port_pressure(s, i);
    sheet_work(s, say("P_%zu", n), state->pressure_force, KENT_FORCE,
               say("p_%zu*A_%zu", n, n), "8.4", "pressure force");
    if (s->moving) {
        sheet_work(s, say("J_%zu", n), state->momentum_flux, KENT_FORCE,
                   say("beta_%zu*rho*Q_%zu*V_%zu", n, n, n), "8.5",
                   "momentum flux, the same for flow either way");
    } else {
        sheet_put(s, say("J_%zu", n), 0.0, KENT_FORCE, KENT_COMPUTED,
                  "momentum flux: no stream");
    }
    sheet_work(s, say("F_%zu", n), state->push, KENT_FORCE, say("P_%zu+J_%zu", n, n),
               "8.1", "push, against the outward direction");
}

/* ---- sum ------------------------------------------------------------------------- */

static double component(kent_vec3 v, char axis)
{
    return axis == 'x' ? v.x : axis == 'y' ? v.y : v.z;
}

/* The water's inertia in the legs: nil where no face distance is given. */
static void sheet_unsteady(const sheet *s)
{
    const kent_balance *b = &s->instant->balance;
    bool changing = false;

    for (size_t i = 0; i < s->count; i++) {
        const kent_port *port = &s->ports[i];
        const size_t n = i + 1;
        const double bore = 0.25 * PI * port->inside_diameter * port->inside_diameter;
        if (b->port[i].flow_rate == 0.0 || !(port->face > 0.0)) continue;
        changing = true;
        sheet_put(s, say("r_%zu", n), port->face, KENT_LENGTH, KENT_GIVEN,
                  "from the centre to the port");
        sheet_put(s, say("w_%zu", n), b->port[i].flow_rate / bore, KENT_ACCELERATION,
                  KENT_COMPUTED, "dV/dt of the stream (8.7)");
    }
    for (const char *axis = "xyz"; *axis != '\0'; axis++) {
        const words symbol = say("U_%c", *axis);
        words formula = say("-rho*(");
        if (!changing) {
            sheet_put(s, symbol, 0.0, KENT_FORCE, KENT_COMPUTED,
                      "force of the changing flow: nil");
            continue;
        }
        for (size_t i = 0, terms = 0; i < s->count; i++) {
            const size_t n = i + 1;
            if (b->port[i].flow_rate == 0.0 || !(s->ports[i].face > 0.0)) continue;
            const words term = say("%sa_%zu*w_%zu*r_%zu*n_%zu%c", terms++ ? "+" : "", n,
                                   n, n, n, *axis);
            words_add(&formula, &term);
        }
        const words close = say(")");
        words_add(&formula, &close);
        sheet_work(s, symbol, component(b->unsteady, *axis), KENT_FORCE, formula, "8.7",
                   "force of the changing flow, never what governs");
    }
}

static void sheet_sum(const sheet *s)
{
    const kent_balance *b = &s->instant->balance;
    const kent_vec3 t = b->thrust;
    static const char *const TOWARDS[] = {"thrust of the water on the fitting, east",
                                          "the same, north", "the same, up"};

    sheet_heading(s, say("Sum"));
    for (const char *axis = "xy"; *axis != '\0'; axis++) {
        sheet_put(s, say("W_%c", *axis), 0.0, KENT_FORCE, KENT_COMPUTED,
                  "weight acts downwards alone");
    }
    sheet_put(s, say("W_z"), b->weight.z, KENT_FORCE,
              s->fitting->weight > 0.0 ? KENT_GIVEN : KENT_ASSUMED,
              s->fitting->weight > 0.0 ? "weight of the fitting and its water"
                                       : "weight of the fitting and its water: left "
                                         "out unless stated");
    sheet_unsteady(s);
    for (size_t k = 0; k < 3; k++) {
        const char axis = "xyz"[k];
        words formula = say("-(");
        for (size_t i = 0; i < s->count; i++) {
            const words term =
                say("%sF_%zu*n_%zu%c", i > 0 ? "+" : "", i + 1, i + 1, axis);
            words_add(&formula, &term);
        }
        const words close = say(")+W_%c+U_%c", axis, axis);
        words_add(&formula, &close);
        sheet_work(s, say("T_%c", axis), component(t, axis), KENT_FORCE, formula, "8.1",
                   TOWARDS[k]);
    }
    kent_derivation_work(s->d, "T_h", kent_thrust_horizontal(t), KENT_FORCE,
                         "sqrt(T_x^2+T_y^2)", "8.8", "sideways thrust");
    kent_derivation_work(s->d, "T", kent_vec3_length(t), KENT_FORCE,
                         "sqrt(T_x^2+T_y^2+T_z^2)", "8.8", "resultant thrust");
}

/* ---- check line, by type --------------------------------------------------------- */

static bool same(double a, double b)
{
    return fabs(a - b) <= 1e-9 * fmax(fabs(a), fabs(b));
}

/* Whether two ports face away from each other on one axis. */
static bool in_line(const kent_port *a, const kent_port *b)
{
    return kent_vec3_length(kent_vec3_add(a->direction, b->direction)) < 1e-6;
}

static void check_bend(const sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;
    const double half = sin(0.5 * s->fitting->angle);

    if (s->count != 2 || !same(p[0].push, p[1].push)) {
        sheet_heading(s, say("Check: no short form, the two ports push differently"));
        return;
    }
    kent_derivation_put(s->d, "theta", s->fitting->angle, KENT_ANGLE, s->geometry,
                        "turn of the bend in space");
    if (s->moving) {
        kent_derivation_work(s->d, "C", 2.0 * p[0].push * half, KENT_FORCE,
                             "2*F_1*sin(theta/2)", "8.9",
                             "check: the resultant, without weight");
    } else {
        kent_derivation_work(s->d, "C", 2.0 * p[0].pressure_force * half, KENT_FORCE,
                             "2*p_1*A_1*sin(theta/2)", "8.9",
                             "check: the resultant, without weight");
    }
}

static void check_branch(const sheet *s)
{
    const bool even = s->count == 3 && in_line(&s->ports[0], &s->ports[1]) &&
                      same(s->ports[0].seal_diameter, s->ports[1].seal_diameter);

    if (!even) {
        sheet_heading(s, say("Check: no short form, the run turns or changes size"));
        return;
    }
    kent_derivation_work(s->d, "C", s->instant->balance.port[2].pressure_force,
                         KENT_FORCE, "p_3*A_3", "8.10",
                         s->moving
                             ? "check: the branch's pressure alone, away from it; "
                               "the streams add the rest"
                             : "check: the resultant over a straight run of one "
                               "size, away from the branch");
}

static void check_reducer(const sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;

    if (s->count != 2 || !in_line(&s->ports[0], &s->ports[1])) {
        sheet_heading(s, say("Check: no short form, the axis turns"));
        return;
    }
    if (s->moving) {
        kent_derivation_work(s->d, "C", fabs(p[0].push - p[1].push), KENT_FORCE,
                             "abs(F_1-F_2)", "8.11",
                             "check: the resultant, along the axis");
    } else {
        const double first = s->ports[0].seal_diameter,
                     second = s->ports[1].seal_diameter;
        const double areas = 0.25 * PI * fabs(first * first - second * second);
        kent_derivation_work(s->d, "C", p[0].pressure * areas, KENT_FORCE,
                             "p_1*abs(A_1-A_2)", "8.11",
                             "check: the resultant, towards the small end");
    }
}

static void check_end(const sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;

    kent_derivation_work(s->d, "C", p[0].push, KENT_FORCE,
                         s->moving ? "p_1*A_1+J_1" : "p_1*A_1", "8.12",
                         "check: the resultant, away from the pipe");
}

static void check_valve(const sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;

    if (s->load->closed) {
        const size_t n = s->load->pressed + 1;
        sheet_work(s, say("C"), p[s->load->pressed].pressure_force, KENT_FORCE,
                   say("p_%zu*A_%zu", n, n), "9.4",
                   "check: the resultant, away from the pressed side");
    } else if (s->count == 2 && !in_line(&s->ports[0], &s->ports[1])) {
        sheet_heading(s, say("Check: no short form, the axis turns"));
    } else if (s->count == 2) {
        kent_derivation_work(s->d, "C", fabs(p[0].push - p[1].push), KENT_FORCE,
                             "abs(F_1-F_2)", "8.11",
                             "check: the resultant, along the axis");
    } else {
        sheet_heading(s, say("The jet behind the valve is left out: it would lessen "
                             "the thrust"));
        check_end(s);
    }
}

static void sheet_check(const sheet *s)
{
    switch (s->fitting->type) {
    case KENT_BEND:
        check_bend(s);
        break;
    case KENT_TEE:
    case KENT_WYE:
        check_branch(s);
        break;
    case KENT_REDUCER:
        check_reducer(s);
        break;
    case KENT_DEAD_END:
        check_end(s);
        break;
    case KENT_VALVE:
        check_valve(s);
        break;
    case KENT_CROSS:
    case KENT_STRAIGHT:
    case KENT_CURVE:
    case KENT_GROUP:
        break;
    }
}

static void sheet_title(const sheet *s, kent_sense sense)
{
    static const char *const WORST[KENT_SENSES] = {
        "largest resultant", "largest sideways thrust", "largest upward thrust",
        "largest downward thrust"};

    if (!s->instant->set) {
        sheet_heading(s, say("Load case %s: no %s", s->load->name, WORST[sense]));
    } else if (isnan(s->instant->time)) {
        sheet_heading(s, say("Load case %s: %s", s->load->name, WORST[sense]));
    } else {
        sheet_heading(s, say("Load case %s: %s, at %.2f s", s->load->name, WORST[sense],
                             s->instant->time));
    }
}

void kent_loads_derive(const kent_model *m, const kent_fitting *fitting,
                       const kent_load_case *load, kent_sense sense, kent_derivation *d)
{
    const kent_instant *instant = &load->worst[sense];
    sheet s = {
        .model = m,
        .fitting = fitting,
        .ports = &m->ports[fitting->port_first],
        .count = fitting->port_count,
        .load = load,
        .instant = instant,
        .geometry = kent_fitting_in_network(fitting) ? KENT_COMPUTED : KENT_GIVEN,
        .d = d,
    };

    sheet_title(&s, sense);
    if (!instant->set) return;
    s.widest = kent_port_widest(s.ports, s.count);
    for (size_t i = 0; i < s.count; i++) {
        if (instant->balance.port[i].flow != 0.0) s.moving = true;
    }
    sheet_water(&s);
    if (!load->given && !load->closed && fitting->type != KENT_VALVE) {
        sheet_pressure(&s, "p", instant->pressure);
    }
    for (size_t i = 0; i < s.count; i++) {
        sheet_geometry(&s, i);
        sheet_stream(&s, i);
    }
    sheet_heading(&s, say(s.count > 1 ? "Push of each port" : "Push of the port"));
    for (size_t i = 0; i < s.count; i++) {
        sheet_push(&s, i);
    }
    sheet_sum(&s);
    sheet_check(&s);
}
