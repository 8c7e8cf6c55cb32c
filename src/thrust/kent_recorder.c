#include "kent_recorder_internal.h"

#include <assert.h>
#include <math.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

static const double PI = 3.14159265358979323846;

/* m/s: beta of the search is taken at the steady flow, but at no slower one than this:
 * 8.6 says why that cannot change what prints. */
static const double USUAL_SPEED = 1.0;

/* ---- what to watch --------------------------------------------------------------- */

int kent_recorder_watch(kent_recorder *r, size_t first, int span, double chainage,
                        size_t *index)
{
    for (size_t i = first; i < r->watch_count; i++) {
        if (r->watches[i].span != span) continue;
        if (r->watches[i].chainage != chainage) continue;
        *index = i;
        return 0;
    }
    if (kent_grow((void **)&r->watches, &r->watch_capacity, r->watch_count + 1,
                  sizeof *r->watches)) {
        return -1;
    }
    r->watches[r->watch_count] = (kent_watch){span, chainage};
    *index = r->watch_count++;
    return 0;
}

/* The sensor's term of a watch, added where it is new. NULL: no memory. */
static kent_term *recorder_term(kent_recorder *r, kent_sensor *sensor, size_t watch)
{
    for (size_t i = 0; i < sensor->term_count; i++) {
        kent_term *term = &r->terms[sensor->term_first + i];
        if (term->watch == watch) return term;
    }
    if (kent_grow((void **)&r->terms, &r->term_capacity, r->term_count + 1,
                  sizeof *r->terms)) {
        return NULL;
    }
    kent_term *term = &r->terms[r->term_count++];
    *term = (kent_term){.watch = watch};
    sensor->term_count++;
    return term;
}

/* s: across the fitting from one port to another and back. */
static double fitting_crossing(const kent_model *m, const kent_fitting *f)
{
    double longest = 0.0, next = 0.0, slowest = INFINITY;

    for (size_t i = 0; i < f->port_count; i++) {
        const kent_port *port = &m->ports[f->port_first + i];
        if (port->kind == KENT_PORT_SPAN) {
            slowest = fmin(slowest, m->spans[port->span].wave_speed);
        }
        next = fmax(next, fmin(longest, port->face));
        longest = fmax(longest, port->face);
    }
    return 2.0 * (longest + next) / slowest;
}

/* N s2/m6: the momentum flux of a port over the square of its flow, beta held at the
 * steady one or a usual one. */
static double flux_per_square(const kent_model *m, const kent_port *port, double flow)
{
    const double bore = 0.25 * PI * port->inside_diameter * port->inside_diameter;
    const double usual = fmax(fabs(flow), USUAL_SPEED * bore);

    return kent_port_momentum_factor(m, port, usual) * m->water.density / bore;
}

/* An open end: no pressure, and the stream that the others bring (8.13). */
static void sensor_add_outlet(const kent_steady *s, const kent_fitting *f, size_t i,
                              kent_sensor *sensor)
{
    const kent_port *ports = &s->model->ports[f->port_first];
    double flow = 0.0;

    for (size_t k = 0; k < f->port_count; k++) {
        if (ports[k].kind != KENT_PORT_SPAN) continue;
        sensor->brings[k] = ports[k].sign;
        flow += ports[k].sign * s->span_flow[ports[k].span];
    }
    sensor->outlet = true;
    sensor->per_outlet_square = kent_vec3_scale(
        -flux_per_square(s->model, &ports[i], flow), ports[i].direction);
}

/* Coefficients of one port's push: F = per_head H + own Q^2 + widest Q_ref^2 +
 * constant, from 8.1 with the pressure of 8.3; Q^2 is the same for flow either way. A
 * dead branch has no Q of its own. */
static int sensor_add_port(kent_recorder *r, const kent_steady *s,
                           const kent_fitting *f, size_t i, kent_sensor *sensor)
{
    const kent_model *m = s->model;
    const kent_port *ports = &m->ports[f->port_first], *port = &ports[i];
    const size_t widest = kent_port_widest(ports, f->port_count);
    const double rho = m->water.density, gravity = m->gravity;
    const double seal = 0.25 * PI * port->seal_diameter * port->seal_diameter;
    const double bore = 0.25 * PI * port->inside_diameter * port->inside_diameter;
    const double wide =
        0.25 * PI * ports[widest].inside_diameter * ports[widest].inside_diameter;
    const double level = kent_port_level(f, port);
    const kent_vec3 inward = kent_vec3_scale(-1.0, port->direction);
    const bool streams = port->kind == KENT_PORT_SPAN;

    kent_term *own = recorder_term(r, sensor, sensor->watch[i]);
    if (!own) return -1;
    own->per_head =
        kent_vec3_add(own->per_head, kent_vec3_scale(rho * gravity * seal, inward));
    sensor->constant = kent_vec3_add(
        sensor->constant, kent_vec3_scale(-rho * gravity * level * seal, inward));
    if (streams) {
        const double flux = flux_per_square(m, port, s->span_flow[port->span]);
        own->per_square = kent_vec3_add(own->per_square, kent_vec3_scale(flux, inward));
    }
    if (f->type == KENT_VALVE || i == widest) return 0;
    if (streams) {
        own->per_square =
            kent_vec3_add(own->per_square,
                          kent_vec3_scale(-0.5 * rho * seal / (bore * bore), inward));
    }
    kent_term *reference = recorder_term(r, sensor, sensor->watch[widest]);
    if (!reference) return -1;
    reference->per_square =
        kent_vec3_add(reference->per_square,
                      kent_vec3_scale(0.5 * rho * seal / (wide * wide), inward));
    return 0;
}

/* Where the ports are looked at: the same in every state. */
static int recorder_watch_fitting(kent_recorder *r, const kent_fitting *f,
                                  size_t *watch)
{
    const size_t first = r->watch_count;
    const kent_port *ports = &r->model->ports[f->port_first];
    const size_t widest = kent_port_widest(ports, f->port_count);

    assert(f->port_count <= KENT_PORTS);
    for (size_t i = 0; i < f->port_count; i++) {
        const kent_port *port = &ports[i];
        if (port->kind != KENT_PORT_SPAN) continue;
        if (kent_recorder_watch(r, first, port->span, port->chainage, &watch[i])) {
            return -1;
        }
    }
    for (size_t i = 0; i < f->port_count; i++) {
        if (ports[i].kind != KENT_PORT_SPAN) watch[i] = watch[widest];
    }
    return 0;
}

static int recorder_add_fitting(kent_recorder *r, size_t state, size_t index)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[index];
    kent_sensor *sensor = &r->sensors[state * m->fitting_count + index];

    sensor->term_first = r->term_count;
    if (!kent_fitting_in_network(f)) return 0;
    if (state > 0) {
        memcpy(sensor->watch, r->sensors[index].watch, sizeof sensor->watch);
    } else if (recorder_watch_fitting(r, f, sensor->watch)) {
        return -1;
    }
    if (f->weight > 0.0) sensor->constant = (kent_vec3){0.0, 0.0, -f->weight};
    for (size_t i = 0; i < f->port_count; i++) {
        if (m->ports[f->port_first + i].kind == KENT_PORT_OUTLET) {
            sensor_add_outlet(r->steadies[state], f, i, sensor);
        } else if (sensor_add_port(r, r->steadies[state], f, i, sensor)) {
            return -1;
        }
    }
    sensor->crossing = fitting_crossing(m, f);
    sensor->faces = f->type == KENT_VALVE || kent_fitting_has_shut_legs(m, f);
    return 0;
}

kent_status kent_recorder_new(const kent_model *m, kent_steady *const *steadies,
                              kent_recorder **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    kent_recorder *r = kent_alloc(1, sizeof *r);

    if (!r) goto done;
    r->model = m;
    r->steadies = steadies;
    r->sensors = kent_alloc(m->state_count, m->fitting_count * sizeof *r->sensors);
    r->slots = kent_alloc(m->march_count, sizeof *r->slots);
    if (!r->sensors || !r->slots) goto done;
    for (size_t s = 0; s < m->state_count; s++) {
        for (size_t i = 0; i < m->fitting_count; i++) {
            if (recorder_add_fitting(r, s, i)) goto done;
        }
    }
    status = kent_along_new(r, err);
    if (status != KENT_OK) goto done;
    *out = r;
    r = NULL; /* handed over */
done:
    kent_recorder_free(r);
    return status ? kent_error_nomem(err) : KENT_OK;
}

void kent_recorder_free(kent_recorder *r)
{
    if (!r) return;
    for (size_t i = 0; r->slots && i < r->model->march_count; i++) {
        free(r->slots[i].seen);
        free(r->slots[i].past);
    }
    kent_along_free(r->along);
    free(r->slots);
    free(r->sensors);
    free(r->terms);
    free(r->watches);
    free(r);
}

const kent_watch *kent_recorder_watches(const kent_recorder *r, size_t *count)
{
    *count = r->watch_count;
    return r->watches;
}

/* ---- one march ------------------------------------------------------------------- */

/* The sensors of the state that a march starts from, [fitting_count]. */
static const kent_sensor *march_sensors(const kent_recorder *r, int march)
{
    const size_t state = (size_t)r->model->marches[march].state;

    return r->sensors + state * r->model->fitting_count;
}

/* Instants to go back for dQ/dt: the crossing in whole steps, at least one. */
static size_t sensor_lag(const kent_sensor *sensor, double step)
{
    if (!(sensor->crossing > 0.0)) return 0;
    return (size_t)fmax(1.0, ceil(sensor->crossing / step - 1e-9));
}

void kent_recorder_start(kent_recorder *r, int march, double step)
{
    kent_slot *slot = &r->slots[march];
    const size_t count = r->model->fitting_count;

    assert(step > 0.0);
    free(slot->seen);
    free(slot->past);
    *slot = (kent_slot){.started = true, .step = step};
    for (size_t i = 0; i < count; i++) {
        const size_t lag = sensor_lag(&r->sensors[i], step);
        if (lag > slot->past_rows) slot->past_rows = lag;
    }
    slot->seen = kent_alloc(count, sizeof *slot->seen);
    slot->past = kent_alloc(slot->past_rows * r->watch_count, sizeof *slot->past);
    slot->failed = !slot->seen || !slot->past;
    kent_along_start(r, march);
    for (size_t i = 0; i < count && !slot->failed; i++) {
        kent_seen *seen = &slot->seen[i];
        seen->best[KENT_RESULTANT] = -1.0; /* nil counts as a resultant */
        seen->lowest = INFINITY;
        seen->highest = -INFINITY;
        for (size_t k = 0; k < KENT_PORTS; k++) {
            seen->highest_head[k] = -INFINITY;
        }
    }
}

unsigned long long kent_level_of(double square)
{
    uint64_t bits = 0;

    /* exponent and ten bits of the mantissa: they grow as the number does */
    memcpy(&bits, &square, sizeof bits);
    return bits >> 42;
}

static inline void seen_count_level(kent_seen *seen, double square)
{
    const unsigned long long level = kent_level_of(square);

    if (level > seen->top) {
        if (level - seen->top >= KENT_LEVELS) {
            memset(seen->at_level, 0, sizeof seen->at_level);
        } else {
            for (unsigned long long k = seen->top + 1; k <= level; k++) {
                seen->at_level[k % KENT_LEVELS] = 0;
            }
        }
        seen->top = level;
    } else if (seen->top - level >= KENT_LEVELS) {
        return; /* far below the peak */
    }
    seen->at_level[level % KENT_LEVELS]++;
}

double kent_seen_above_90_percent(const kent_seen *seen, double step)
{
    const unsigned long long least = kent_level_of(0.81 * seen->best[KENT_RESULTANT]);
    double instants = 0.0;

    for (unsigned long long k = least; k <= seen->top; k++) {
        instants += seen->at_level[k % KENT_LEVELS];
    }
    return instants * step;
}

/* m3/s at a watch, `lag` instants before row n of the trace. */
static double slot_flow_before(const kent_slot *slot, const kent_trace *trace,
                               size_t watches, size_t watch, size_t n, size_t lag)
{
    if (n >= lag) return trace->flow[(n - lag) * trace->watch_count + watch];
    const size_t back = lag - n; /* 1: the instant before this trace */
    return slot->past[(slot->past_rows - back) * watches + watch];
}

static void seen_keep(const kent_recorder *r, const kent_slot *slot,
                      const kent_trace *trace, size_t index, size_t n,
                      kent_frame *frame)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[index];
    const kent_sensor *sensor = &r->sensors[index];
    const size_t lag = sensor_lag(sensor, slot->step);

    *frame = (kent_frame){.time = trace->time[n]};
    for (size_t i = 0; i < f->port_count; i++) {
        const size_t watch = sensor->watch[i], at = n * trace->watch_count + watch;
        const double sign = m->ports[f->port_first + i].sign;
        frame->head[i] = trace->head[at];
        frame->flow[i] = sign * trace->flow[at];
        if (lag == 0) continue;
        const double before =
            sign * slot_flow_before(slot, trace, r->watch_count, watch, n, lag);
        frame->flow_rate[i] =
            (frame->flow[i] - before) / ((double)lag * slot->step); /* 8.7 */
    }
    kent_frame_complete(m, f, frame);
}

/* Thrusts of consecutive instants, component by component: the shape compilers
 * vectorise. */
enum { CHUNK = 64 };

typedef struct kent_thrusts {
    double x[CHUNK], y[CHUNK], z[CHUNK]; /* N */
} kent_thrusts;

/* What the stream of an open end adds, for `count` instants. */
static void sensor_add_streams(const kent_sensor *sensor, size_t ports,
                               const kent_trace *trace, size_t first, size_t count,
                               kent_thrusts *out)
{
    const size_t width = trace->watch_count;

    for (size_t n = 0; n < count; n++) {
        const double *flow = trace->flow + (first + n) * width;
        double drawn = 0.0;
        for (size_t k = 0; k < ports; k++) {
            drawn += sensor->brings[k] * flow[sensor->watch[k]];
        }
        out->x[n] += sensor->per_outlet_square.x * drawn * drawn;
        out->y[n] += sensor->per_outlet_square.y * drawn * drawn;
        out->z[n] += sensor->per_outlet_square.z * drawn * drawn;
    }
}

/* 9.6 for `count` instants from row `first` of the trace. */
static void sensor_thrusts(const kent_recorder *r, const kent_sensor *sensor,
                           const kent_trace *trace, size_t first, size_t count,
                           kent_thrusts *out)
{
    double h[CHUNK], square[CHUNK];

    for (size_t n = 0; n < count; n++) {
        out->x[n] = sensor->constant.x;
        out->y[n] = sensor->constant.y;
        out->z[n] = sensor->constant.z;
    }
    for (size_t k = 0; k < sensor->term_count; k++) {
        const kent_term term = r->terms[sensor->term_first + k];
        const size_t width = trace->watch_count, from = first * width + term.watch;
        for (size_t n = 0; n < count; n++) {
            const double flow = trace->flow[from + n * width];
            h[n] = trace->head[from + n * width];
            square[n] = flow * flow;
        }
        for (size_t n = 0; n < count; n++) {
            out->x[n] += term.per_head.x * h[n] + term.per_square.x * square[n];
            out->y[n] += term.per_head.y * h[n] + term.per_square.y * square[n];
            out->z[n] += term.per_head.z * h[n] + term.per_square.z * square[n];
        }
    }
}

/* Finds the worst instants of a trace for one fitting, then keeps those alone. */
static void seen_take(const kent_recorder *r, const kent_sensor *sensor,
                      const kent_slot *slot, const kent_trace *trace, size_t index)
{
    kent_seen *seen = &slot->seen[index];
    size_t at[KENT_SENSES];
    const size_t ports = r->model->fittings[index].port_count;
    bool better[KENT_SENSES] = {false};
    kent_thrusts t;

    for (size_t first = 0; first < trace->count; first += CHUNK) {
        const size_t left = trace->count - first, count = left < CHUNK ? left : CHUNK;
        sensor_thrusts(r, sensor, trace, first, count, &t);
        if (sensor->outlet) sensor_add_streams(sensor, ports, trace, first, count, &t);
        for (size_t n = 0; n < count; n++) {
            const double sideways = t.x[n] * t.x[n] + t.y[n] * t.y[n];
            const double all = sideways + t.z[n] * t.z[n];
            const double now[KENT_SENSES] = {all, sideways, t.z[n], -t.z[n]};
            if (!(all >= 0.0)) continue; /* not a number */
            for (size_t k = 0; k < KENT_SENSES; k++) {
                if (!(now[k] > seen->best[k])) continue;
                seen->best[k] = now[k];
                at[k] = first + n;
                better[k] = true;
            }
            seen_count_level(seen, all);
        }
    }
    for (size_t k = 0; k < KENT_SENSES; k++) {
        if (better[k]) seen_keep(r, slot, trace, index, at[k], &seen->frame[k]);
    }
}

/* The instants of the lowest and the highest head. */
static void seen_take_heads(const kent_recorder *r, const kent_slot *slot,
                            const kent_trace *trace, size_t index)
{
    const kent_fitting *f = &r->model->fittings[index];
    const size_t widest =
        kent_port_widest(&r->model->ports[f->port_first], f->port_count);
    const size_t watch = r->sensors[index].watch[widest];
    kent_seen *seen = &slot->seen[index];
    size_t low = trace->count, high = trace->count; /* none */

    for (size_t n = 0; n < trace->count; n++) {
        const double head = trace->head[n * trace->watch_count + watch];
        if (head < seen->lowest) {
            seen->lowest = head;
            low = n;
        }
        if (head > seen->highest) {
            seen->highest = head;
            high = n;
        }
    }
    if (low < trace->count) seen_keep(r, slot, trace, index, low, &seen->frame_lowest);
    if (high < trace->count) {
        seen_keep(r, slot, trace, index, high, &seen->frame_highest);
    }
}

bool kent_recorder_counts(const kent_recorder *r, size_t march)
{
    const kent_model *m = r->model;
    return r->slots[march].started &&
           !m->scenarios[m->marches[march].scenario].for_comparison;
}

/* The highest head at each port: what presses there once something is shut. */
static void seen_take_faces(const kent_recorder *r, const kent_trace *trace,
                            size_t index, kent_seen *seen)
{
    const kent_fitting *f = &r->model->fittings[index];

    for (size_t i = 0; i < f->port_count; i++) {
        const size_t watch = r->sensors[index].watch[i];
        for (size_t n = 0; n < trace->count; n++) {
            const double head = trace->head[n * trace->watch_count + watch];
            if (!(head > seen->highest_head[i])) continue;
            seen->highest_head[i] = head;
            seen->highest_at[i] = trace->time[n];
        }
    }
}

/* Keeps the last rows of past and trace together. Before t = 0 flow was steady. */
static void slot_take_past(const kent_recorder *r, kent_slot *slot,
                           const kent_trace *trace)
{
    const size_t rows = slot->past_rows, width = r->watch_count;
    const size_t fresh = trace->count < rows ? trace->count : rows;

    if (rows == 0) return;
    memmove(slot->past, slot->past + fresh * width,
            (rows - fresh) * width * sizeof *slot->past);
    for (size_t k = 0; k < fresh; k++) {
        const size_t n = trace->count - fresh + k;
        memcpy(slot->past + (rows - fresh + k) * width,
               trace->flow + n * trace->watch_count, width * sizeof *slot->past);
    }
}

void kent_recorder_take(kent_recorder *r, int march, const kent_trace *trace)
{
    kent_slot *slot = &r->slots[march];
    const kent_sensor *sensors = march_sensors(r, march);

    assert(slot->started && trace->watch_count >= r->watch_count);
    if (slot->failed || trace->count == 0) return;
    for (size_t k = 0; k < slot->past_rows && !slot->past_filled; k++) {
        memcpy(slot->past + k * r->watch_count, trace->flow,
               r->watch_count * sizeof *slot->past);
    }
    slot->past_filled = true;
    for (size_t i = 0; i < r->model->fitting_count; i++) {
        const kent_fitting *f = &r->model->fittings[i];
        if (!kent_fitting_in_network(f)) continue;
        seen_take(r, &sensors[i], slot, trace, i);
        seen_take_heads(r, slot, trace, i);
        if (sensors[i].faces) seen_take_faces(r, trace, i, &slot->seen[i]);
    }
    kent_along_take(r, march, trace);
    slot_take_past(r, slot, trace);
}
