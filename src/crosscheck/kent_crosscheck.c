#include "kent_crosscheck.h"

#include <math.h>
#include <stdlib.h>

const double KENT_CROSSCHECK_ASKED = 0.02;

/* m, of the coarser mesh: at most, and how many cells a main has at least and at most
 * (spans shorter than three cells apart). */
static const double LONGEST_CELL = 40.0;
static const double CELLS_LEAST = 100.0, CELLS_MOST = 3000.0;
/* A rigid column is 1000 times as stiff; asked of events that take so many 2L/a. */
static const double RIGID = 1000.0, SLOW = 4.0;

enum { FINE, COARSE, STIFF, WAYS };

/* ---- how slow -------------------------------------------------------------------- */

/* s: how long an event goes on changing something. */
static double event_ramp(const kent_model *m, const kent_event *e)
{
    if (e->kind == KENT_EVENT_PUMP && e->action == KENT_TRIP) return 0.0;
    if (e->law_count == 0) return fmax(e->ramp_time, 0.0);
    const kent_law_point *law = m->law + e->law_first;
    return law[e->law_count - 1].time - law[0].time;
}

static void start_at(double *time, int node)
{
    if (node >= 0) time[node] = 0.0;
}

/* Marks the nodes from which an event sends its waves. */
static void mark_source(const kent_model *m, const kent_event *e, double *time)
{
    switch (e->kind) {
    case KENT_EVENT_VALVE:
        start_at(time, m->valves[e->target].node[0]);
        start_at(time, m->valves[e->target].node[1]);
        break;
    case KENT_EVENT_OUTFLOW:
        start_at(time, m->outflows[e->target].node);
        break;
    case KENT_EVENT_PUMP:
        start_at(time, m->pumps[e->target].node[0]);
        start_at(time, m->pumps[e->target].node[1]);
        break;
    case KENT_EVENT_FIXED_LEVEL:
        start_at(time, m->fixed_levels[e->target].node);
        break;
    case KENT_EVENT_BURST:
        start_at(time, m->bursts[e->target].node);
        break;
    }
}

/* Lets a wave that is at one end at a time be at the other; whether that was news. */
static bool reach(double *time, const int node[2], double way)
{
    bool news = false;
    for (int side = 0; side < 2; side++) {
        if (node[0] < 0 || node[1] < 0) continue;
        if (!(time[node[side]] + way < time[node[!side]])) continue;
        time[node[!side]] = time[node[side]] + way;
        news = true;
    }
    return news;
}

/* s: time of a wave from any event to the node that it reaches last, and back. */
static double farthest(const kent_model *m, double *time)
{
    double last = 0.0;
    for (bool news = true; news;) {
        news = false;
        for (size_t i = 0; i < m->span_count; i++) {
            const kent_span *s = &m->spans[i];
            news |= reach(time, s->node, s->length / s->wave_speed);
        }
        for (size_t i = 0; i < m->valve_count; i++) {
            news |= reach(time, m->valves[i].node, 0.0);
        }
        for (size_t i = 0; i < m->device_count; i++) {
            news |= reach(time, m->devices[i].node, 0.0);
        }
    }
    for (size_t i = 0; i < m->node_count; i++) {
        if (isfinite(time[i])) last = fmax(last, time[i]);
    }
    return 2.0 * last;
}

static kent_status judge_speed(const kent_model *m, const kent_scenario *s,
                               kent_opinion *out, kent_error *err)
{
    double *time = kent_alloc(m->node_count, sizeof *time);
    if (!time) return kent_error_nomem(err);
    out->ramp = INFINITY;
    for (size_t i = 0; i < s->event_count; i++) {
        const kent_event *e = &m->events[s->event_first + i];
        for (size_t n = 0; n < m->node_count; n++) {
            time[n] = INFINITY;
        }
        out->ramp = fmin(out->ramp, event_ramp(m, e));
        mark_source(m, e, time);
        out->back_and_forth = fmax(out->back_and_forth, farthest(m, time));
    }
    free(time);
    return KENT_OK;
}

bool kent_opinion_is_asked(const kent_opinion *o)
{
    return o->ramp >= o->back_and_forth;
}

/* ---- what is left out ------------------------------------------------------------ */

static void say_left_out(const kent_model *m, kent_opinion *o)
{
    kent_notes *n = &o->left_out;
    const bool below = o->report.below_vapour;
    if (m->solver.column_separation != KENT_SEPARATION_NONE) {
        kent_notes_add(n, "Column separation: pipes stay full in the second method%s",
                       below ? ", and its head falls below the vapour limit here. From "
                               "then on the two solve different problems"
                             : "; its head stays above the vapour limit here");
    } else if (below) {
        kent_notes_add(n, "Column separation, by both methods: heads fall below the "
                          "vapour limit here, where water parts and neither is right");
    }
    if (m->solver.friction == KENT_SURGE_UNSTEADY) {
        kent_notes_add(n, "Unsteady friction: the second method's is quasi-steady, so "
                          "that its waves fade less");
    }
    for (size_t i = 0; m->solver.creep && i < m->pipe_count; i++) {
        if (m->pipes[i].creep_count == 0) continue;
        kent_notes_add(n, "Creep of plastic walls: they are elastic in the second "
                          "method, so that its waves fade less");
        break;
    }
}

/* ---- solving --------------------------------------------------------------------- */

typedef struct plan {
    const kent_model *model;
    kent_steady *const *steadies;
    const kent_march *marches;
    kent_opinion *out;
    double cell;        /* m, coarser mesh */
    kent_error *errors; /* [jobs] */
    kent_status *statuses;
} plan;

static double choose_cell(const kent_model *m)
{
    double length = 0.0; /* m */
    for (size_t i = 0; i < m->span_count; i++) {
        length += m->spans[i].length;
    }
    const double wanted = fmin(LONGEST_CELL, length / CELLS_LEAST);
    return fmax(wanted, length / CELLS_MOST);
}

/* Job 3 i is march i on the finer mesh: the long ones come first. */
static void solve_job(void *context, size_t index)
{
    plan *p = context;
    const size_t i = index / WAYS;
    const kent_mesh meshes[WAYS] = {
        [FINE] = {p->cell, 2, 1.0},
        [COARSE] = {p->cell, 1, 1.0},
        [STIFF] = {INFINITY, 1, RIGID},
    };
    kent_opinion *o = &p->out[i];
    kent_second_peak *const peaks[WAYS] = {o->peaks, o->coarse, o->rigid};
    kent_second_report coarse = {0};
    kent_second_report *const reports[WAYS] = {
        [FINE] = &o->report, [COARSE] = &coarse, [STIFF] = &o->rigid_report};
    const kent_steady *s = p->steadies[p->marches[i].state];
    if (!peaks[index % WAYS]) return;
    p->statuses[index] = kent_second_solve(s->model, s, p->marches[i].scenario, 0.0,
                                           &meshes[index % WAYS], peaks[index % WAYS],
                                           reports[index % WAYS], &p->errors[index]);
}

static kent_status prepare(const plan *p, size_t i, kent_error *err)
{
    const kent_model *m = p->model;
    kent_opinion *o = &p->out[i];
    const kent_status status =
        judge_speed(m, &m->scenarios[p->marches[i].scenario], o, err);
    if (status) return status;
    o->cell = 0.5 * p->cell;
    o->peaks = kent_alloc(m->point_count, sizeof *o->peaks);
    o->coarse = kent_alloc(m->point_count, sizeof *o->coarse);
    if (!o->peaks || !o->coarse) return kent_error_nomem(err);
    if (!(o->ramp >= SLOW * o->back_and_forth) || isinf(o->ramp)) return KENT_OK;
    o->rigid = kent_alloc(m->point_count, sizeof *o->rigid);
    return o->rigid ? KENT_OK : kent_error_nomem(err);
}

kent_status kent_crosscheck_run(const kent_model *m, kent_steady *const *steadies,
                                const kent_march *marches, size_t count,
                                unsigned threads, kent_opinion *out, kent_error *err)
{
    plan p = {.model = m,
              .steadies = steadies,
              .marches = marches,
              .out = out,
              .cell = choose_cell(m)};
    const size_t jobs = count * WAYS;
    kent_status status = KENT_OK;
    p.errors = kent_alloc(jobs, sizeof *p.errors);
    p.statuses = kent_alloc(jobs, sizeof *p.statuses);
    if (!p.errors || !p.statuses) status = kent_error_nomem(err);
    for (size_t i = 0; i < count && !status; i++) {
        status = prepare(&p, i, err);
    }
    if (!status) kent_queue_run(jobs, threads, solve_job, &p);
    for (size_t j = 0; j < jobs && !status; j++) {
        if (p.statuses[j] == KENT_E_SOLVE) {
            out[j / WAYS].stopped = p.errors[j];
        } else if (p.statuses[j]) {
            *err = p.errors[j];
            status = p.statuses[j];
        }
    }
    for (size_t i = 0; i < count && !status; i++) {
        if (out[i].rigid_report.switches > 0) {
            free(out[i].rigid); /* what slams has no end in a rigid column */
            out[i].rigid = NULL;
        }
        say_left_out(m, &out[i]);
        if (out[i].left_out.failed) status = kent_error_nomem(err);
    }
    free(p.errors);
    free(p.statuses);
    return status;
}

void kent_opinion_clear(kent_opinion *o)
{
    free(o->peaks);
    free(o->coarse);
    free(o->rigid);
    kent_notes_clear(&o->left_out);
    *o = (kent_opinion){0};
}
