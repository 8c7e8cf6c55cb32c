/* A pumping station: units of one kind side by side, each with its own check valve.
 *
 * Units that have had the same events are one group. Every group sees the same rise of
 * head; its flow follows from that, and its speed from its ramp or, without power, from
 * inertia and torque together with the flow: 13.10 to 13.12. One group leads: its flow
 * is what the others leave of the whole, and its rise is the device's law. */
#include "kent_device_internal.h"
#include "kent_flap_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
static const double RAMP_END = 1.0 - 1e-12; /* as in kent_schedule */
/* m: a smaller head pushes no water through a unit that stands. */
static const double PUSHED = 1e-3;

enum { GROUPS = 8, TRIES = 200 };

typedef enum mode {
    STANDING, /* at rest behind its shut check valve: passes nothing */
    DRIVEN,   /* its motor holds it to a speed */
    FREE      /* without power */
} mode;

typedef struct group {
    int units;
    mode mode;
    bool ran;                   /* at t = 0, or started since */
    double speed, flow, torque; /* of one unit, at the last instant: rad/s, m3/s, N m */
    double from, to, start, ramp; /* of its speed: rad/s; s */
    double next;                  /* rad/s at the step's end, where it is driven */
    double free;                  /* s of this step without power */
    double share;                 /* of the torque at its end in what acts on it */
    kent_flap flap;
} group;

typedef struct station {
    const kent_pump *pump;
    int index;
    double size_area,
        bore_area;     /* m2, of its check valve (NAN: not known), of the pipe */
    double time, step; /* s, of the step under way */
    size_t events;     /* that have begun */
    size_t count, lead;
    bool crowded, short_of_units, backwards;
    bool pushed; /* a standing unit has held water back that ran forward */
    double slam; /* m/s, greatest so far */
    group groups[GROUPS];
} station;
_Static_assert(sizeof(station) <= KENT_DEVICE_STATE, "a pump's state");

static station *of(kent_device_state *state) { return (station *)(void *)state->bytes; }
static const station *as(const kent_device_state *state)
{
    return (const station *)(const void *)state->bytes;
}

/* ---- one unit -------------------------------------------------------------------- */

/* What one unit adds to the head (m), less what its check valve takes, at a flow. */
typedef struct lift {
    double rise, slope; /* m; s/m2 by flow, its speed following */
    double speed;       /* rad/s, at the step's end */
    double torque;      /* N m */
} lift;

/* 13.10: the speed that inertia and the torque leave at the step's end. As torque grows
 * with the square of the speed either way, there is one: Newton's method between
 * brackets finds it. */
static kent_pump_point run_down(const station *s, const group *g, double flow,
                                double *speed, double *by_flow)
{
    const kent_pump_curve *curve = &s->pump->curve;
    const double c = g->share * g->free / s->pump->inertia;
    const double target =
        g->speed - (1.0 - g->share) * g->free / s->pump->inertia * g->torque;
    double w = g->speed, low = -INFINITY, high = INFINITY;
    kent_pump_point p = kent_pump_at(curve, flow, w);

    for (int i = 0; i < TRIES; i++) {
        const double gap = w - target + c * p.torque;
        if (gap == 0.0) break;
        if (gap < 0.0) low = w;
        if (gap > 0.0) high = w;
        /* Where torque falls as speed rises the slope is held up. */
        const double wish = gap / fmax(1.0 + c * p.torque_by_speed, 0.25);
        const double most = curve->rated_speed + fabs(w);
        double next = w - fmin(fmax(wish, -most), most);
        if (fabs(next - w) <= 1e-16 * most) break;
        if (next <= low || next >= high) next = 0.5 * (low + high);
        w = next;
        p = kent_pump_at(curve, flow, w);
    }
    *speed = w;
    *by_flow = -c * p.torque_by_flow / fmax(1.0 + c * p.torque_by_speed, 0.25);
    return p;
}

/* 13.11 */
static lift lift_at(const station *s, const group *g, double flow)
{
    double speed = g->next, by_flow = 0.0;
    const kent_pump_point p = g->mode == FREE
                                  ? run_down(s, g, flow, &speed, &by_flow)
                                  : kent_pump_at(&s->pump->curve, flow, speed);
    const double loss = s->pump->check_loss;
    return (lift){p.head - loss * flow * fabs(flow),
                  p.head_by_flow + p.head_by_speed * by_flow - 2.0 * loss * fabs(flow),
                  speed, p.torque};
}

/* The flow at which one unit adds a given rise, nearest to what it passed before:
 * Newton's method between brackets, as if its rise never grew with flow. by_rise: m2/s.
 */
static double flow_at(const station *s, const group *g, double rise, double *by_rise)
{
    const kent_pump_curve *curve = &s->pump->curve;
    const bool one_way = kent_flap_is_one_way(&g->flap);
    const double least = 1e-3 * curve->rated_head / curve->rated_flow;
    double low = one_way ? 0.0 : -INFINITY, high = INFINITY;
    double q = one_way ? fmax(g->flow, 0.0) : g->flow;
    lift l;

    *by_rise = 0.0;
    if (g->mode == STANDING) return 0.0;
    if (one_way && lift_at(s, g, 0.0).rise <= rise) return 0.0;
    for (int i = 0; i < TRIES; i++) {
        l = lift_at(s, g, q);
        const double spare = l.rise - rise;
        if (spare == 0.0) break;
        if (spare > 0.0) low = q;
        if (spare < 0.0) high = q;
        const double most = 0.5 * (curve->rated_flow + fabs(q));
        const double wish = spare / fmax(-l.slope, least);
        double next = q + fmin(fmax(wish, -most), most);
        if (fabs(next - q) <= 1e-16 * (curve->rated_flow + fabs(q))) break;
        if (next <= low || next >= high) next = 0.5 * (low + high);
        q = next;
    }
    l = lift_at(s, g, q);
    *by_rise = -1.0 / fmax(-l.slope, least);
    return q;
}

/* ---- the station ----------------------------------------------------------------- */

static double rise_between(const station *s, const double head[2])
{
    return head[1] - (s->pump->node[0] < 0 ? s->pump->suction_level : head[0]);
}

/* m3/s of all but the leading group; by_rise m2/s. */
static double others(const station *s, double rise, double *by_rise)
{
    double sum = 0.0;
    *by_rise = 0.0;
    for (size_t i = 0; i < s->count; i++) {
        const group *g = &s->groups[i];
        double by = 0.0;
        if (i == s->lead) continue;
        sum += g->units * flow_at(s, g, rise, &by);
        *by_rise += g->units * by;
    }
    return sum;
}

/* The leading group's equation at its unit's flow q: its rise must be the station's. */
static kent_flap_gap leading(const station *s, double q, double rise)
{
    const group *g = &s->groups[s->lead];
    const kent_pump_curve *curve = &s->pump->curve;
    const bool one_way = kent_flap_is_one_way(&g->flap);
    const lift l = lift_at(s, g, one_way ? fmax(q, 0.0) : q);
    if (!one_way) return (kent_flap_gap){rise - l.rise, -l.slope, false};
    return kent_flap_law(q, rise - l.rise, -l.slope,
                         100.0 * curve->rated_head / curve->rated_flow);
}

/* 13.12 */
static kent_device_law law(const kent_device_state *state, double flow,
                           const double head[2])
{
    const station *s = as(state);
    const group *g = &s->groups[s->lead];
    if (g->mode == STANDING) return (kent_device_law){flow, 1.0, {0.0, 0.0}};

    const double rise = rise_between(s, head);
    double others_by_rise = 0.0;
    const double q = (flow - others(s, rise, &others_by_rise)) / g->units;
    const kent_flap_gap l = leading(s, q, rise);
    const double by_flow = l.slope / g->units;
    const double by_rise = (l.shut ? 0.0 : 1.0) - by_flow * others_by_rise;
    return (kent_device_law){l.value, by_flow, {-by_rise, by_rise}};
}

/* The group that leads: one that is driven where there is one, then the larger. */
static void choose_lead(station *s)
{
    s->lead = 0;
    for (size_t i = 1; i < s->count; i++) {
        const group *g = &s->groups[i], *best = &s->groups[s->lead];
        const int rank = g->mode == STANDING                  ? 0
                         : g->mode == DRIVEN && g->next > 0.0 ? 2
                                                              : 1;
        const int best_rank = best->mode == STANDING                     ? 0
                              : best->mode == DRIVEN && best->next > 0.0 ? 2
                                                                         : 1;
        if (rank > best_rank || (rank == best_rank && g->units > best->units)) {
            s->lead = i;
        }
    }
}

/* ---- events ---------------------------------------------------------------------- */

static double ramped(const group *g, double time)
{
    const double elapsed = time - g->start;
    if (!(g->ramp > 0.0) || elapsed >= g->ramp * RAMP_END) return g->to;
    return g->from + (g->to - g->from) * fmax(elapsed, 0.0) / g->ramp;
}

/* Whether an event of that action is for such units: power is taken from those that
 * have it, and given to those that have none or are being stopped. */
static bool concerns(kent_action action, const group *g)
{
    const bool powered = g->mode == DRIVEN && g->to > 0.0;
    switch (action) {
    case KENT_START:
        return !powered;
    case KENT_TRIP:
    case KENT_STOP:
    case KENT_RAMP:
        break;
    }
    return powered;
}

static void happen(const station *s, group *g, const kent_event *e)
{
    const double rated = s->pump->curve.rated_speed;
    const double now = g->mode == DRIVEN ? ramped(g, e->start_time) : g->speed;
    switch (e->action) {
    case KENT_TRIP:
        g->mode = FREE;
        g->speed = now;
        g->free = s->time - e->start_time;
        return;
    case KENT_START:
        g->to = rated;
        break;
    case KENT_STOP:
        g->to = 0.0;
        break;
    case KENT_RAMP:
        g->to = e->to * rated;
        break;
    }
    g->mode = DRIVEN;
    g->ran = true;
    g->from = now;
    g->start = e->start_time;
    g->ramp = e->ramp_time;
}

/* Some units of a group part from the others. NULL: there is no room for more groups.
 */
static group *split(station *s, group *g, int units)
{
    if (units == g->units) return g;
    if (s->count == GROUPS) {
        s->crowded = true;
        return NULL;
    }
    group *parted = &s->groups[s->count++];
    *parted = *g;
    parted->units = units;
    g->units -= units;
    return parted;
}

static void apply(station *s, const kent_event *e)
{
    int wanted = e->how_many;
    const bool all = wanted == 0;
    const size_t count = s->count;
    for (size_t i = 0; i < count && (all || wanted > 0); i++) {
        group *g = &s->groups[i];
        if (!concerns(e->action, g)) continue;
        g = split(s, g, all || wanted > g->units ? g->units : wanted);
        if (!g) return;
        wanted -= g->units;
        happen(s, g, e);
    }
    if (!all && wanted > 0) s->short_of_units = true;
}

static bool are_alike(const group *a, const group *b, double time)
{
    if (a->mode != b->mode || a->ran != b->ran || a->mode == FREE) return false;
    if (a->mode == STANDING) return true;
    const bool settled = a->speed == b->speed && a->to == b->to && a->speed == a->to &&
                         ramped(a, time) == a->to && ramped(b, time) == b->to;
    return settled && isnan(a->flap.since) && isnan(b->flap.since) &&
           a->flap.shut == b->flap.shut;
}

/* Units that stand or run alike again are one group again. */
static void merge(station *s)
{
    for (size_t i = 0; i < s->count; i++) {
        group *a = &s->groups[i];
        for (size_t k = i + 1; k < s->count; k++) {
            const group *b = &s->groups[k];
            if (!are_alike(a, b, s->time - s->step)) continue;
            const double share = (double)b->units / (double)(a->units + b->units);
            a->flow += share * (b->flow - a->flow);
            a->torque += share * (b->torque - a->torque);
            a->units += b->units;
            s->groups[k--] = s->groups[--s->count];
        }
    }
}

/* 13.10: half the torque is that at the step's end, and more where the rotor is so
 * light that it would ring. */
static double share_of_end(const station *s, const group *g)
{
    const kent_pump_point p = kent_pump_at(&s->pump->curve, g->flow, g->speed);
    const double stiff = g->free * p.torque_by_speed / s->pump->inertia;
    return stiff > 2.0 ? 1.0 - 1.0 / stiff : 0.5;
}

/* ---- the device ------------------------------------------------------------------ */

/* m2, of the largest pipe at a pump's delivery, else at its suction; NAN: none. */
static double bore_beside(const kent_model *m, const kent_pump *p)
{
    double area = NAN;
    for (int side = 1; side >= 0 && isnan(area); side--) {
        if (p->node[side] < 0) continue;
        const kent_node *node = &m->nodes[p->node[side]];
        for (size_t i = 0; i < node->end_count; i++) {
            area = fmax(area, m->spans[m->ends[node->end_first + i].span].area);
        }
    }
    return area;
}

static void add_group(station *s, int units, mode how, double speed)
{
    if (units <= 0) return;
    s->groups[s->count++] = (group){.units = units,
                                    .mode = how,
                                    .ran = speed > 0.0,
                                    .speed = speed,
                                    .from = speed,
                                    .to = speed,
                                    .next = speed};
}

static kent_status start(kent_device_state *state, const kent_model *m, int index,
                         double flow, const double head[2], kent_error *err)
{
    const kent_pump *p = &m->pumps[index];
    const mode standing = p->check_valve == KENT_CHECK_NONE ? DRIVEN : STANDING;
    station *s = of(state);
    double by_rise = 0.0;
    (void)err;

    *s = (station){.pump = p,
                   .index = index,
                   .size_area = 0.25 * PI * p->check_size * p->check_size,
                   .bore_area = bore_beside(m, p)};
    add_group(s, p->running, DRIVEN, p->curve.rated_speed);
    add_group(s, p->in_parallel - p->running, standing, 0.0);
    choose_lead(s);
    for (size_t i = 0; i < s->count; i++) { /* open until their flows are known */
        s->groups[i].flap = kent_flap_new(p->check_valve, p->check_delay, 1.0);
    }
    const double rest = flow - others(s, rise_between(s, head), &by_rise);
    for (size_t i = 0; i < s->count; i++) {
        group *g = &s->groups[i];
        g->flow = i == s->lead ? rest / g->units
                               : flow_at(s, g, rise_between(s, head), &by_rise);
        if (g->mode == STANDING) g->flow = 0.0;
        g->flap = kent_flap_new(p->check_valve, p->check_delay, g->flow);
        g->torque = kent_pump_at(&p->curve, g->flow, g->speed).torque;
    }
    return KENT_OK;
}

static void begin_events(station *s, const kent_schedule *schedule, double time)
{
    const kent_course *course =
        kent_schedule_course(schedule, KENT_EVENT_PUMP, s->index);
    if (!course) return;
    for (; s->events < course->count; s->events++) {
        const kent_event *e = schedule->moves[course->first + s->events].event;
        if (!(e->start_time < time)) return;
        apply(s, e);
    }
}

static void move(kent_device_state *state, const kent_schedule *schedule, double time,
                 double step)
{
    station *s = of(state);
    s->time = time;
    s->step = step;
    merge(s);
    for (size_t i = 0; i < s->count; i++) {
        s->groups[i].free = step;
    }
    begin_events(s, schedule, time);
    for (size_t i = 0; i < s->count; i++) {
        group *g = &s->groups[i];
        if (g->mode == DRIVEN) g->next = ramped(g, time);
        if (g->mode == FREE) g->share = share_of_end(s, g);
        if (g->mode == STANDING || !kent_flap_move(&g->flap, time, g->flow)) continue;
        const bool own_size = s->size_area > 0.0;
        const double flow = own_size ? -g->flow : -g->flow * g->units;
        s->slam = fmax(s->slam, flow / (own_size ? s->size_area : s->bore_area));
    }
    choose_lead(s);
}

static bool stands(const station *s)
{
    for (size_t i = 0; i < s->count; i++) {
        if (s->groups[i].mode == STANDING) return true;
    }
    return false;
}

static void settle_unit(station *s, group *g, double flow)
{
    const lift l = lift_at(s, g, flow);
    kent_flap_settle(&g->flap, g->flow, flow, s->time, s->step);
    g->flow = flow;
    g->speed = l.speed;
    g->torque = l.torque;
    if (l.speed < -0.01 * s->pump->curve.rated_speed) s->backwards = true;
}

static void settle(kent_device_state *state, double flow, const double head[2])
{
    station *s = of(state);
    group *first = &s->groups[s->lead];
    const double rise = rise_between(s, head);
    if (rise < -PUSHED && stands(s)) s->pushed = true;
    if (first->mode == STANDING) return;

    double by_rise = 0.0;
    const double q = (flow - others(s, rise, &by_rise)) / first->units;
    const double led = leading(s, q, rise).shut ? 0.0 : q;
    for (size_t i = 0; i < s->count; i++) {
        group *g = &s->groups[i];
        if (g->mode == STANDING) continue;
        settle_unit(s, g, i == s->lead ? led : flow_at(s, g, rise, &by_rise));
    }
}

/* The units that run, or have run, whose speed is furthest from the rated one. */
static void tell(const kent_device_state *state, double told[KENT_TOLD])
{
    const station *s = as(state);
    const double rated = s->pump->curve.rated_speed;
    const group *shown = NULL;
    for (size_t i = 0; i < s->count; i++) {
        const group *g = &s->groups[i];
        if (!g->ran) continue;
        if (!shown || fabs(g->speed - rated) > fabs(shown->speed - rated)) shown = g;
    }
    told[0] = shown ? shown->speed : 0.0;
    told[1] = shown ? shown->torque : 0.0;
    told[2] = s->slam;
}

static const char *beyond(const kent_device_state *state)
{
    return as(state)->crowded
               ? "has units in more different conditions at once than can be followed; "
                 "let more of them trip, start or stop together"
               : NULL;
}

static const char *caution(const kent_device_state *state)
{
    const station *s = as(state);
    if (s->short_of_units) {
        return "had fewer units to trip, start or stop than an event asks for";
    }
    if (s->backwards) return "turned backwards";
    if (!s->pushed) return NULL;
    return "had units standing while the head before them was higher than behind them: "
           "water would run on through them, which is not followed; they are taken to "
           "be shut off";
}

const kent_device_ops KENT_AT_PUMP = {
    .quantities = {{"speed_rads", "speed", KENT_ROTATION},
                   {"torque_Nm", "torque", KENT_MOMENT},
                   {"slam_velocity_ms", "reverse velocity on closing", KENT_SPEED}},
    .start = start,
    .move = move,
    .law = law,
    .settle = settle,
    .tell = tell,
    .beyond = beyond,
    .caution = caution,
};
