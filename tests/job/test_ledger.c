/* The water of every march of every case that comes with the program, weighed at every
 * instant: what arrives at a node is taken there, what enters pipes they hold, what
 * devices take they hold. Marched on the coarse grid through the public marcher.
 *
 * Each twice: without friction, the first STEPS steps, where pipes keep water to
 * rounding; and with the friction of the case, as many and on to the end of its last
 * event while fewer than MOST_STEPS, where what it takes at ends of spans and beside
 * cavities is reckoned by its law (toll.h). */
#include "kent_case.h"
#include "kent_cavities_internal.h"
#include "ledger.h"
#include "march.h"
#include "toll.h"

#include <glob.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { STEPS = 3000, MOST_STEPS = 12000 };

/* m3/s that counts as a flow at least: in still water rounding of heads is all. */
static const double LEAST_FLOW = 1e-4;
/* Of the largest flow of a march so far, for rounding. */
static const double AT_NODES = 1e-11, IN_PIPES = 1e-10, IN_DEVICES = 1e-11;
/* Of what friction takes. The march has it from straight lines over an eighth of an
 * octave of the Reynolds number at most: they miss the edge where turbulent friction
 * meets 64/Re by up to 1/32 (half of an eighth, half way), and 1/Re by 0.35 %. */
static const double BY_LAW = 0.033;
/* Of heads and of what pipes hold. */
static const double ROUNDING = 1e-12;

/* All that is known of a march at one instant. */
typedef struct instant {
    double time;
    double *head, *flow, *hollow; /* [node_total] span by span */
    double (*ends)[2];            /* [span_count] m3/s */
    kent_device_row *devices;     /* [device_count] */
} instant;

typedef struct books {
    const char *name; /* of the case */
    const kent_model *model;
    const kent_steady *steady;
    kent_grid *grid;
    kent_marcher *marcher;
    kent_schedule *schedule;
    toll **tolls;   /* [span_count] */
    double *parted; /* [node_total] m3/s, for toll_take */
    double *woken; /* [span_count] m3: what waking or falling asleep may have changed in
                      the step before, whose flows beside cavities are not known */
    double gas;    /* m: kent_cavities' gas over the room that it has */
    instant now, before;
    double largest;                      /* m3/s so far */
    double at_nodes, in_pipes, in_tanks; /* worst so far, of what is allowed */
    double entered, missed;              /* m3, of the whole march */
} books;

/* What the marches of all cases came to. */
typedef struct sums {
    int marches, kinds, parted, cut;
    size_t steps;
    double share; /* the largest that friction and walls take of what passes */
} sums;

/* ---- one instant ----------------------------------------------------------------- */

static void instant_new(instant *i, const kent_model *m, const kent_grid *grid)
{
    i->head = kent_alloc(3 * grid->node_total, sizeof *i->head);
    i->ends = kent_alloc(m->span_count, sizeof *i->ends);
    i->devices = kent_alloc(m->device_count, sizeof *i->devices);
    assert_true(i->head && i->ends && i->devices);
    i->flow = i->head + grid->node_total;
    i->hollow = i->flow + grid->node_total;
}

static void instant_clear(instant *i)
{
    free(i->head);
    free(i->ends);
    free(i->devices);
}

/* First grid point of a span in an instant's arrays. */
static size_t first_of(const books *b, size_t span)
{
    size_t first = 0;
    for (size_t s = 0; s < span; s++) {
        first += (size_t)b->grid->reaches[s] + 1;
    }
    return first;
}

/* False where the march stops. */
static bool look(books *b, kent_error *err)
{
    const instant was = b->before;
    kent_trace trace;
    b->before = b->now;
    b->now = was;
    if (kent_marcher_advance(b->marcher, 1, &trace, err) != 1) return false;
    instant *i = &b->now;
    i->time = trace.time[0];
    for (size_t d = 0; d < trace.device_count; d++) {
        i->devices[d] = trace.devices[d];
    }
    size_t first = 0;
    for (size_t s = 0; s < b->model->span_count; s++) {
        const size_t n = (size_t)b->grid->reaches[s];
        double *head = i->head + first, *flow = i->flow + first;
        kent_marcher_profile(b->marcher, (int)s, head, flow);
        kent_marcher_hollow(b->marcher, (int)s, i->hollow + first);
        i->ends[s][0] = flow[0];
        i->ends[s][1] = flow[n];
        b->largest = fmax(b->largest, fmax(fabs(flow[0]), fabs(flow[n])));
        first += n + 1;
    }
    return true;
}

/* Keeps the worst share of what is allowed; fails the test beyond it. */
static void weigh(const books *b, double gap, double allowed, double *worst,
                  const char *what, const char *which)
{
    const double share = fabs(gap) / allowed;
    if (!(share <= *worst)) *worst = share;
    if (share <= 1.0) return;
    fail_msg("%s: %s %s at %g s: %g, allowed %g", b->name, what, which, b->now.time,
             gap, allowed);
}

/* ---- nodes ----------------------------------------------------------------------- */

/* Of the room of a cavity: what it may gain on waking or lose on falling asleep. 15.9
 */
static double woke(const books *b, double before, double now, double room)
{
    const bool changed = (before == 0.0) != (now == 0.0);
    return changed ? room * b->gas / KENT_CAVITY_HEIGHTS.wakes : 0.0;
}

static double value_of(const books *b, kent_event_kind kind, size_t target,
                       double otherwise)
{
    const kent_course *course = kent_schedule_course(b->schedule, kind, (int)target);
    return course ? kent_schedule_value(b->schedule, course, b->now.time) : otherwise;
}

/* m3/s that an outflow draws at a head. 6.4, 7.16 */
static double drawn(const books *b, size_t outflow, double head)
{
    const kent_model *m = b->model;
    const kent_outflow *o = &m->outflows[outflow];
    const double wanted = value_of(b, KENT_EVENT_OUTFLOW, outflow, o->flow);
    const double above = head - m->points[o->point].at.z;
    const double full = o->full_pressure / (m->water.density * m->gravity);
    if (wanted <= 0.0) return wanted;
    if (!o->pressure_dependent || full <= 0.0) return wanted;
    if (above <= 0.0) return 0.0;
    return above >= full ? wanted : wanted * sqrt(above / full);
}

/* Where a node's own heads are, and how much a cavity there has grown (m3). */
typedef struct here {
    double head, grown, may_wake, left_over;
    bool fixed, short_of_head;
} here;

static here look_at(const books *b, size_t node)
{
    const kent_model *m = b->model;
    const kent_node *at = &m->nodes[node];
    const kent_end *e = &m->ends[at->end_first];
    const size_t place = first_of(b, (size_t)e->span) +
                         (e->side == 1 ? (size_t)b->grid->reaches[e->span] : 0);
    const double before = b->before.hollow[place], now = b->now.hollow[place];
    double room = 0.0; /* m3 */
    for (size_t i = 0; i < at->end_count; i++) {
        const int s = m->ends[at->end_first + i].span;
        room += 0.5 * m->spans[s].area * m->spans[s].length / b->grid->reaches[s];
    }
    here h = {.head = b->now.head[place],
              .grown = now - before,
              .may_wake = woke(b, before, now, room)};
    h.left_over = ledger_left_over(m, (int)node, (const double(*)[2])b->now.ends,
                                   b->now.devices) +
                  h.grown / b->grid->step;
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        if (m->fixed_levels[i].node == (int)node) h.fixed = true;
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        const kent_outflow *o = &m->outflows[i];
        if (o->node != (int)node) continue;
        h.left_over -= drawn(b, i, h.head);
        if (h.head <= m->points[o->point].at.z + 1e-6) h.short_of_head = true;
    }
    return h;
}

/* What passes a valve by its law (7.18) at the heads beside it. Squared, because a head
 * known to rounding gives a small flow no better than its root. */
static void weigh_valve(books *b, size_t valve, const here *side)
{
    const kent_valve *v = &b->model->valves[valve];
    const double opening = value_of(b, KENT_EVENT_VALVE, valve, v->opening);
    const double e = b->steady->valve_capacity[valve] *
                     kent_valve_relative_capacity(&v->curve, opening);
    const double q = side[0].left_over, flow = AT_NODES * b->largest;
    const double other = v->node[1] < 0 ? v->discharge_level : side[1].head;
    const double waking =
        (side[0].may_wake + (v->node[1] < 0 ? 0.0 : side[1].may_wake)) / b->grid->step;
    const double tolerance = flow + waking;
    if (v->node[1] >= 0) {
        weigh(b, q + side[1].left_over, tolerance, &b->at_nodes, "valve", v->id);
    }
    weigh(b, q * fabs(q) - e * e * (side[0].head - other),
          2.0 * fabs(q) * tolerance + tolerance * tolerance +
              e * e * 1e2 * ROUNDING * (fabs(side[0].head) + fabs(other) + 1.0),
          &b->at_nodes, "law of valve", v->id);
}

static void weigh_nodes(books *b, bool *by_valve)
{
    const kent_model *m = b->model;
    for (size_t i = 0; i < m->node_count; i++) {
        by_valve[i] = m->nodes[i].end_count == 0;
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        const int *node = m->valves[i].node;
        here side[2] = {look_at(b, (size_t)node[0])};
        if (node[1] >= 0) side[1] = look_at(b, (size_t)node[1]);
        assert_false(by_valve[node[0]] || (node[1] >= 0 && by_valve[node[1]]));
        by_valve[node[0]] = true;
        if (node[1] >= 0) by_valve[node[1]] = true;
        weigh_valve(b, i, side);
    }
    for (size_t i = 0; i < m->node_count; i++) {
        if (by_valve[i]) continue;
        const here h = look_at(b, i);
        if (h.fixed || h.short_of_head) continue; /* gives and takes what it likes */
        weigh(b, h.left_over, AT_NODES * b->largest + h.may_wake / b->grid->step,
              &b->at_nodes, "node", m->points[m->nodes[i].point].id);
    }
}

/* ---- pipes and devices ----------------------------------------------------------- */

/* Every span, over the step from the instant before, when its toll fell due. */
static void weigh_pipes(books *b, const double *due, const double *rough)
{
    const kent_model *m = b->model;
    const double step = b->grid->step;
    size_t first = 0;
    for (size_t s = 0; s < m->span_count; s++) {
        const size_t n = (size_t)b->grid->reaches[s];
        const double impedance = ledger_impedance(m, b->grid, s);
        const double *hollow = b->now.hollow + first, *old = b->before.hollow + first;
        const double room = m->spans[s].area * m->spans[s].length / (double)n;
        const double now =
            ledger_held(n, impedance, step, b->now.head + first, b->now.flow + first);
        const double before = ledger_held(n, impedance, step, b->before.head + first,
                                          b->before.flow + first);
        double grown = 0.0, waking = 0.0;
        for (size_t i = 1; i < n; i++) {
            /* of two waves that leave, each has half of what its node's cavity grows */
            const double parted = (hollow[i] - old[i]) / step;
            grown += hollow[i] - old[i];
            grown -= 0.5 * step * (parted - b->parted[first + i]);
            waking += woke(b, old[i], hollow[i], room);
            b->parted[first + i] = parted;
        }
        const double net = step * (b->now.ends[s][0] - b->now.ends[s][1]);
        const double gap = now - before - grown - net + due[s];
        weigh(b, gap,
              IN_PIPES * step * b->largest + ROUNDING * (fabs(now) + fabs(before)) +
                  BY_LAW * rough[s] + waking + b->woken[s],
              &b->in_pipes, "span", m->spans[s].id);
        b->woken[s] = waking;
        b->missed += now - before - grown - net;
        b->entered += 0.5 * step * (fabs(b->now.ends[s][0]) + fabs(b->now.ends[s][1]));
        first += n + 1;
    }
}

static void ask_tolls(books *b, double *due, double *rough)
{
    size_t first = 0;
    for (size_t s = 0; s < b->model->span_count; s++) {
        due[s] = toll_take(b->tolls[s], b->now.head + first, b->now.flow + first,
                           b->parted + first, &rough[s]);
        first += (size_t)b->grid->reaches[s] + 1;
    }
}

static void weigh_devices(books *b)
{
    const kent_model *m = b->model;
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        const double before = ledger_taken(m, d, b->before.devices[i].told);
        const double now = ledger_taken(m, d, b->now.devices[i].told);
        if (isnan(now)) continue;
        const double flowed = ledger_flowed(d, b->before.devices[i].flow,
                                            b->now.devices[i].flow, b->grid->step);
        weigh(b, now - before - flowed,
              IN_DEVICES * b->grid->step * b->largest +
                  ROUNDING * (fabs(now) + fabs(before)),
              &b->in_tanks, kent_device_word(d->kind), d->id);
    }
}

/* ---- marches --------------------------------------------------------------------- */

static double end_of_events(const kent_model *m, const kent_scenario *s)
{
    double end = 0.0; /* s */
    for (size_t i = 0; i < s->event_count; i++) {
        const kent_event *e = &m->events[s->event_first + i];
        double lasts = isnan(e->ramp_time) ? 0.0 : e->ramp_time;
        if (e->law_count > 0) lasts = m->law[e->law_first + e->law_count - 1].time;
        end = fmax(end, e->start_time + lasts);
    }
    return fmin(end, s->duration);
}

static size_t steps_of(const books *b, int scenario, bool *cut)
{
    const kent_scenario *s = &b->model->scenarios[scenario];
    const size_t all = (size_t)ceil(s->duration / b->grid->step - 1e-9);
    size_t wanted = (size_t)ceil(end_of_events(b->model, s) / b->grid->step) + 1;
    if (wanted < STEPS) wanted = STEPS;
    const bool rubs = b->model->solver.friction != KENT_SURGE_NONE;
    const size_t most = rubs ? MOST_STEPS : STEPS;
    if (wanted > most) wanted = most;
    *cut = wanted < all;
    return *cut ? wanted : all;
}

static void open_books(books *b, int scenario)
{
    const kent_model *m = b->model;
    kent_error err = {0};
    if (kent_grid_plan(m, m->scenarios[scenario].duration, &b->grid, &err) ||
        kent_marcher_new(m, b->steady, b->grid, scenario, NULL, 0, 1, &b->marcher,
                         &err) ||
        kent_schedule_new(m, scenario, &b->schedule, &err)) {
        fail_msg("%s: %s", b->name, err.what);
    }
    instant_new(&b->now, m, b->grid);
    instant_new(&b->before, m, b->grid);
    b->parted = kent_alloc(b->grid->node_total, sizeof *b->parted);
    b->tolls = kent_alloc(m->span_count, sizeof(toll *));
    b->woken = kent_alloc(m->span_count, sizeof *b->woken);
    assert_true(b->parted && b->tolls && b->woken);
    for (size_t s = 0; s < m->span_count; s++) {
        b->tolls[s] = toll_new(m, b->steady, b->grid, s);
        assert_non_null(b->tolls[s]);
    }
    if (m->solver.column_separation == KENT_SEPARATION_GAS) { /* 15.3 */
        b->gas = KENT_CAVITY_GAS * 101325.0 / (m->water.density * m->gravity);
    }
}

static void close_books(books *b)
{
    for (size_t s = 0; s < b->model->span_count; s++) {
        toll_free(b->tolls[s]);
    }
    free(b->tolls);
    free(b->parted);
    free(b->woken);
    instant_clear(&b->now);
    instant_clear(&b->before);
    kent_schedule_free(b->schedule);
    kent_marcher_free(b->marcher);
    kent_grid_free(b->grid);
}

static void march_one(const char *name, const kent_steady *steady, int scenario,
                      sums *all)
{
    books b = {
        .name = name, .model = steady->model, .steady = steady, .largest = LEAST_FLOW};
    const kent_model *m = b.model;
    kent_error err = {0};
    bool cut = false;
    open_books(&b, scenario);
    const size_t steps = steps_of(&b, scenario, &cut);
    double *due = kent_alloc(2 * m->span_count, sizeof *due);
    double *rough = due + m->span_count;
    bool *by_valve = kent_alloc(m->node_count, sizeof *by_valve);
    assert_true(due && by_valve);
    size_t done = 0;
    kent_cavity largest;
    while (done <= steps && look(&b, &err)) {
        if (done++ > 0) {
            weigh_nodes(&b, by_valve);
            weigh_pipes(&b, due, rough);
            weigh_devices(&b);
        }
        ask_tolls(&b, due, rough);
    }
    if (done <= steps) print_message("%s stops: %s\n", name, err.what);
    /* the case's own friction must let it through */
    assert_true(done > steps || m->solver.friction == KENT_SURGE_NONE);
    const double share = fabs(b.missed) / fmax(b.entered, 1e-300);
    print_message("%s, %s: %zu steps%s; of what is allowed: nodes %.2g, pipes %.2g, "
                  "devices %.2g; friction and walls take %.2g of what passes\n",
                  name, m->scenarios[scenario].id, done - 1, cut ? " of more" : "",
                  b.at_nodes, b.in_pipes, b.in_tanks, share);
    all->marches++;
    all->cut += cut ? 1 : 0;
    all->steps += done - 1;
    all->parted += kent_marcher_cavities(b.marcher, &largest, 1) > 0 ? 1 : 0;
    for (size_t i = 0; i < m->device_count; i++) {
        all->kinds |= 1 << m->devices[i].kind;
    }
    all->share = fmax(all->share, share);
    free(due);
    free(by_valve);
    close_books(&b);
}

static void march_case(const char *path, kent_model *m, sums *all)
{
    kent_error err = {0};
    kent_steady **steadies = kent_alloc(m->state_count, sizeof(kent_steady *));
    const char *name = strrchr(path, '/') + 1;
    assert_non_null(steadies);
    if (m->march_count > 0 && kent_steady_solve_states(m, steadies, &err)) {
        fail_msg("%s: %s", path, err.what);
    }
    for (size_t i = 0; i < m->march_count; i++) {
        march_one(name, steadies[m->marches[i].state], m->marches[i].scenario, all);
    }
    for (size_t i = 0; i < m->state_count; i++) {
        kent_steady_free(steadies[i]);
    }
    free(steadies);
}

static sums march_all(bool rubs)
{
    kent_complaints complaints = {0};
    kent_error err = {0};
    kent_catalogue *catalogue = NULL;
    sums all = {0};
    glob_t cases = {0};
    assert_int_equal(
        kent_catalogue_read(KENT_SOURCE_DIR "/config", &catalogue, &complaints, &err),
        KENT_OK);
    static const char *const folder[] = {"learn", "design", "experiments"};
    for (int i = 0; i < 3; i++) {
        char pattern[512];
        (void)snprintf(pattern, sizeof pattern, KENT_SOURCE_DIR "/cases/%s/*/*.cfg",
                       folder[i]);
        assert_int_equal(glob(pattern, i > 0 ? GLOB_APPEND : 0, NULL, &cases), 0);
    }
    for (size_t i = 0; i < cases.gl_pathc; i++) {
        kent_model *m = NULL;
        if (kent_case_read(cases.gl_pathv[i], catalogue, NULL, &m, &complaints, &err)) {
            fail_msg("%s is no sound case", cases.gl_pathv[i]);
        }
        if (!rubs) m->solver.friction = KENT_SURGE_NONE;
        march_case(cases.gl_pathv[i], m, &all);
        kent_model_free(m);
    }
    globfree(&cases);
    kent_catalogue_free(catalogue);
    print_message("%d marches, %d of them cut short, %d with cavities, %zu steps\n",
                  all.marches, all.cut, all.parted, all.steps);
    assert_true(all.marches >= 20 && all.parted > 0);
    assert_true((all.kinds & (1 << KENT_DEVICE_AIR_VESSEL)) != 0);
    return all;
}

static void without_friction_no_water_is_lost_or_made(void **state)
{
    (void)state;
    (void)march_all(false);
}

static void with_friction_only_what_its_law_says_is(void **state)
{
    (void)state;
    const sums all = march_all(true);
    assert_true(all.share > 0.0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(without_friction_no_water_is_lost_or_made),
        cmocka_unit_test(with_friction_only_what_its_law_says_is),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
