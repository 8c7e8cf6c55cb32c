#include "kent_limit_table.h"

#include "kent_reach.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>

/* A pipe is thin where it buckles under less than so many atmospheres, or under less
 * than so many times what it meets: beyond that nobody looks (common practice: factors
 * of 2 to 3 on a ring). */
static const double THIN = 4.0;

/* One case while it is held against everything. */
typedef struct holding {
    kent_results *results;
    kent_name when;
    int state, march;
    kent_rating rating;
    double lowest_asked;             /* Pa; NAN */
    double everywhere;               /* Pa, of a test without a gauge; else NAN */
    const kent_scenario_result *run; /* NULL: no march */
    bool for_comparison;
    kent_reached *highest, *lowest, *outward; /* [pipe_count] */
    size_t capacity;                          /* of the results' rows */
    bool failed;
} holding;

double kent_limit_margin(const kent_limit *l)
{
    const bool below = l->kind == KENT_LIMIT_LOWEST || l->kind == KENT_LIMIT_VAPOUR;
    return below ? l->reached - l->asked : l->asked - l->reached;
}

const char *kent_limit_word(kent_limit_kind kind)
{
    switch (kind) {
    case KENT_LIMIT_PIPE:
        return "pipe";
    case KENT_LIMIT_JOINT:
        return "joints";
    case KENT_LIMIT_FITTING:
        return "fitting";
    case KENT_LIMIT_LOWEST:
        return "lowest";
    case KENT_LIMIT_VAPOUR:
        return "vapour";
    case KENT_LIMIT_COLLAPSE:
        return "collapse";
    case KENT_LIMIT_KINDS:
        break;
    }
    return "";
}

/* ---- rows ------------------------------------------------------------------------ */

static kent_limit row_of(const holding *h, kent_limit_kind kind, kent_reached at,
                         double asked)
{
    return (kent_limit){.kind = kind,
                        .when = h->when,
                        .state = h->state,
                        .march = h->march,
                        .pipe = -1,
                        .note = -1,
                        .span = at.span,
                        .point = at.point,
                        .chainage = at.chainage,
                        .time = at.time,
                        .reached = at.pressure,
                        .asked = asked,
                        .rating = h->rating,
                        .for_comparison = h->for_comparison};
}

/* Takes a row; NaN on either side exceeds nothing. */
static void add_row(holding *h, kent_limit row)
{
    kent_results *r = h->results;
    row.exceeded = row.exceeded || kent_limit_margin(&row) < 0.0;
    if (h->failed || kent_grow((void **)&r->limits, &h->capacity, r->limit_count + 1,
                               sizeof *r->limits) != 0) {
        h->failed = true;
        return;
    }
    r->limits[r->limit_count++] = row;
    if (row.exceeded && !row.for_comparison) r->limit_exceeded = true;
}

static void add_pipe_row(holding *h, kent_limit_kind kind, size_t pipe, kent_reached at,
                         double asked)
{
    kent_limit row = row_of(h, kind, at, asked);
    row.pipe = (int)pipe;
    if (at.span >= 0) add_row(h, row);
}

static void begin(holding *h, kent_name when, int state, int march, kent_rating rating)
{
    h->when = when;
    h->state = state;
    h->march = march;
    h->rating = rating;
    h->run = NULL;
    h->for_comparison = false;
    h->everywhere = NAN;
}

/* ---- pipes ----------------------------------------------------------------------- */

static void hold_highest(holding *h)
{
    const kent_model *m = h->results->model;
    for (size_t i = 0; i < m->pipe_count; i++) {
        add_pipe_row(h, KENT_LIMIT_PIPE, i, h->highest[i],
                     kent_pipe_rating(&m->pipes[i], h->rating));
    }
    for (size_t i = 0; i < m->pipe_count; i++) {
        if (isnan(m->pipes[i].joint_rating)) continue;
        add_pipe_row(h, KENT_LIMIT_JOINT, i, h->highest[i], m->pipes[i].joint_rating);
    }
}

/* Pa, at which a pipe buckles; NAN: its wall is not known. */
static double collapse_of(const kent_pipe *p)
{
    const double wall = isnan(p->wall_minimum) ? p->wall : p->wall_minimum;
    return kent_ring_collapse(p->modulus, p->poisson, wall, p->outside_diameter - wall);
}

static void hold_collapse(holding *h)
{
    const kent_model *m = h->results->model;
    for (size_t i = 0; i < m->pipe_count; i++) {
        const double asked = collapse_of(&m->pipes[i]);
        kent_reached at = h->outward[i];
        at.pressure = -at.pressure;
        if (!(asked < THIN * fmax(m->barometric, at.pressure))) continue;
        add_pipe_row(h, KENT_LIMIT_COLLAPSE, i, at, asked);
    }
}

/* Whether a cavity opened on a pipe or at one of its ends: it keeps the pressure at the
 * limit. */
static bool is_parted(const holding *h, size_t pipe)
{
    const kent_model *m = h->results->model;
    for (size_t i = 0; i < h->run->cavity_count; i++) {
        const kent_cavity *c = &h->run->cavities[i];
        if (c->span >= 0 && (size_t)m->spans[c->span].pipe == pipe) return true;
        if (c->node < 0) continue;
        const kent_node *node = &m->nodes[c->node];
        for (size_t k = 0; k < node->end_count; k++) {
            const int span = m->ends[node->end_first + k].span;
            if ((size_t)m->spans[span].pipe == pipe) return true;
        }
    }
    return false;
}

static void hold_vapour(holding *h)
{
    const kent_model *m = h->results->model;
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_reached at = h->lowest[i];
        const double boils = m->water.vapour_pressure - m->barometric;
        kent_limit row = row_of(h, KENT_LIMIT_VAPOUR, at, boils);
        row.pipe = (int)i;
        row.exceeded = is_parted(h, i);
        if (at.span >= 0) add_row(h, row);
    }
}

static void hold_lowest(holding *h)
{
    const kent_model *m = h->results->model;
    for (size_t i = 0; i < m->pipe_count; i++) {
        add_pipe_row(h, KENT_LIMIT_LOWEST, i, h->lowest[i], h->lowest_asked);
    }
    if (h->run) hold_vapour(h);
    hold_collapse(h);
}

/* ---- fittings -------------------------------------------------------------------- */

static double rating_of(const kent_fitting_note *n, kent_rating rating)
{
    switch (rating) {
    case KENT_RATING_SURGE:
    case KENT_RATING_RECURRING:
        return n->surge_rating;
    case KENT_RATING_TEST:
        return n->test_rating;
    case KENT_RATING_SERVICE:
    case KENT_RATINGS:
        break;
    }
    return n->rating;
}

/* The highest at a point: on either side of what stands there. */
static kent_reached highest_at(const holding *h, int point, const double *level)
{
    const kent_model *m = h->results->model;
    kent_reached at = {NAN, NAN, NAN, point, -1};
    double head = level ? *level : NAN;
    if (h->run) {
        head = h->run->points[point].highest_head;
        at.time = h->run->points[point].highest_at;
    }
    at.pressure = isnan(h->everywhere)
                      ? kent_model_pressure(m, head, m->points[point].at.z)
                      : h->everywhere;
    return at;
}

/* m: the head at a point where it is the same all along a pipe's piece, or on a line
 * between its ends; the highest where several meet. NAN: on no span. */
static double head_at(const kent_model *m, int point, const double *node_head)
{
    double head = NAN;
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *s = &m->spans[i];
        const double a = node_head[s->node[0]], b = node_head[s->node[1]];
        for (size_t k = 0; k < s->route_count; k++) {
            const size_t at = s->route_first + k;
            if (m->route[at] != point) continue;
            const double x = m->chainage[at] - m->chainage[s->route_first];
            head = fmax(head, a + x / s->length * (b - a));
        }
    }
    return head;
}

/* node_head: [node_count] m; NULL: a march. */
static void hold_fittings(holding *h, const double *node_head)
{
    const kent_model *m = h->results->model;
    for (size_t i = 0; i < m->note_count; i++) {
        const kent_fitting_note *n = &m->notes[i];
        if (isnan(n->rating) || n->point < 0) continue;
        const double level = node_head ? head_at(m, n->point, node_head) : NAN;
        if (node_head && isnan(level)) continue; /* no pump reaches it */
        const kent_reached at = highest_at(h, n->point, &level);
        kent_limit row = row_of(h, KENT_LIMIT_FITTING, at, rating_of(n, h->rating));
        row.note = (int)i;
        add_row(h, row);
    }
}

/* One without a network knows the pressures of its ports alone. */
static void hold_given(holding *h)
{
    const kent_model *m = h->results->model;
    begin(h, kent_name_in_state(m, "given", -1), -1, -1, KENT_RATING_SERVICE);
    for (size_t i = 0; i < m->note_count; i++) {
        const kent_fitting_note *n = &m->notes[i];
        kent_reached at = kent_reach_nothing();
        if (isnan(n->rating) || n->point >= 0) continue;
        for (size_t k = 0; k < n->port_count; k++) {
            at.pressure = fmax(at.pressure, m->given_ports[n->port_first + k].pressure);
        }
        kent_limit row = row_of(h, KENT_LIMIT_FITTING, at, n->rating);
        row.note = (int)i;
        add_row(h, row);
    }
}

/* ---- cases ----------------------------------------------------------------------- */

static void clear_reached(holding *h)
{
    for (size_t i = 0; i < h->results->model->pipe_count; i++) {
        h->highest[i] = h->lowest[i] = h->outward[i] = kent_reach_nothing();
    }
}

static void further(kent_reached *most, kent_search search, kent_reached at)
{
    *most = kent_reach_further(search, *most, at);
}

/* Of water at rest or steady: node_head [node_count] m. */
static void look_at_lines(holding *h, const double *node_head)
{
    const kent_model *m = h->results->model;
    clear_reached(h);
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *s = &m->spans[i];
        const double head[2] = {node_head[s->node[0]], node_head[s->node[1]]};
        const int span = (int)i, p = s->pipe;
        further(&h->highest[p], KENT_SEARCH_HIGHEST,
                kent_reach_of_line(m, span, head, KENT_SEARCH_HIGHEST));
        further(&h->lowest[p], KENT_SEARCH_LOWEST,
                kent_reach_of_line(m, span, head, KENT_SEARCH_LOWEST));
        further(&h->outward[p], KENT_SEARCH_OUTWARD,
                kent_reach_of_line(m, span, head, KENT_SEARCH_OUTWARD));
    }
}

/* Of water that pumps at no flow press, the same all along a span; head [node_count]
 * becomes that of its nodes. */
static void look_at_shut_off(holding *h, double *head)
{
    const kent_model *m = h->results->model;
    clear_reached(h);
    for (size_t i = 0; i < m->node_count; i++) {
        head[i] = NAN;
    }
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *s = &m->spans[i];
        const double level = kent_shut_off_level(m, (int)i);
        if (isnan(level)) continue;
        const double ends[2] = {level, level};
        further(&h->highest[s->pipe], KENT_SEARCH_HIGHEST,
                kent_reach_of_line(m, (int)i, ends, KENT_SEARCH_HIGHEST));
        head[s->node[0]] = fmax(head[s->node[0]], level);
        head[s->node[1]] = fmax(head[s->node[1]], level);
    }
}

static void look_at_march(holding *h)
{
    const kent_model *m = h->results->model;
    clear_reached(h);
    for (size_t i = 0; i < m->span_count; i++) {
        const int span = (int)i, p = m->spans[i].pipe;
        further(&h->highest[p], KENT_SEARCH_HIGHEST,
                kent_reach_of_march(m, h->run, span, KENT_SEARCH_HIGHEST));
        further(&h->lowest[p], KENT_SEARCH_LOWEST,
                kent_reach_of_march(m, h->run, span, KENT_SEARCH_LOWEST));
        further(&h->outward[p], KENT_SEARCH_OUTWARD,
                kent_reach_of_march(m, h->run, span, KENT_SEARCH_OUTWARD));
    }
}

static void hold_static(holding *h, double *head)
{
    const kent_model *m = h->results->model;
    for (size_t i = 0; i < m->node_count; i++) {
        head[i] = kent_static_level(m, (int)i);
    }
    begin(h, kent_name_in_state(m, "static", -1), -1, -1, KENT_RATING_SERVICE);
    look_at_lines(h, head);
    hold_highest(h);
    hold_fittings(h, head);
}

static void hold_shut_off(holding *h, double *head)
{
    const kent_model *m = h->results->model;
    if (m->pump_count == 0) return;
    begin(h, kent_name_in_state(m, "shut-off", -1), -1, -1, KENT_RATING_SERVICE);
    look_at_shut_off(h, head);
    hold_highest(h);
    hold_fittings(h, head);
}

static void hold_steady(holding *h, size_t state)
{
    const kent_model *m = h->results->model;
    const double *head = h->results->steadies[state]->node_head;
    begin(h, kent_name_in_state(m, "steady", (int)state), (int)state, -1,
          KENT_RATING_SERVICE);
    h->lowest_asked = m->asked.lowest_steady;
    look_at_lines(h, head);
    hold_highest(h);
    hold_fittings(h, head);
    hold_lowest(h);
}

static void hold_march(holding *h, size_t index)
{
    const kent_model *m = h->results->model;
    const kent_scenario_result *run = &h->results->scenarios[index];
    const kent_scenario *s = &m->scenarios[run->scenario];
    begin(h, kent_name_in_state(m, s->id, run->state), -1, (int)index,
          s->class_of == KENT_RECURRING ? KENT_RATING_RECURRING : KENT_RATING_SURGE);
    h->run = run;
    h->for_comparison = s->for_comparison;
    h->lowest_asked = m->asked.lowest[s->class_of];
    look_at_march(h);
    hold_highest(h);
    hold_fittings(h, NULL);
    hold_lowest(h);
}

/* Still water from the gauge; without one every place has the test pressure itself. */
static void hold_test(holding *h, const kent_site_test *test, double *head)
{
    const kent_model *m = h->results->model;
    const double column = test->pressure / (m->water.density * m->gravity);
    const bool own = test->gauge < 0;
    for (size_t i = 0; i < m->node_count; i++) {
        const int point = own ? m->nodes[i].point : test->gauge;
        head[i] = m->points[point].at.z + column;
    }
    begin(h, kent_name_in_state(m, "test", -1), -1, -1, KENT_RATING_TEST);
    if (own) h->everywhere = test->pressure;
    look_at_lines(h, head);
    for (size_t i = 0; own && i < m->pipe_count; i++) {
        h->highest[i].pressure = test->pressure;
    }
    hold_highest(h);
    hold_fittings(h, head);
}

kent_status kent_limit_table_fill(kent_results *r, kent_error *err)
{
    const kent_model *m = r->model;
    const kent_site_test *test = &r->loads->test;
    holding h = {.results = r,
                 .highest = kent_alloc(m->pipe_count, sizeof *h.highest),
                 .lowest = kent_alloc(m->pipe_count, sizeof *h.lowest),
                 .outward = kent_alloc(m->pipe_count, sizeof *h.outward)};
    double *head = kent_alloc(m->node_count, sizeof *head);
    h.failed = !h.highest || !h.lowest || !h.outward || !head;
    if (!h.failed && m->span_count > 0) {
        hold_static(&h, head);
        hold_shut_off(&h, head);
        for (size_t i = 0; i < r->steady_count; i++) {
            hold_steady(&h, i);
        }
        for (size_t i = 0; i < r->scenario_count; i++) {
            hold_march(&h, i);
        }
        if (!isnan(test->pressure)) hold_test(&h, test, head);
    }
    if (!h.failed) hold_given(&h);
    free(head);
    free(h.highest);
    free(h.lowest);
    free(h.outward);
    return h.failed ? kent_error_nomem(err) : KENT_OK;
}
