/* The main in words, point by point along every pipe. */
#include "kent_pressures.h"
#include "kent_view.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

static const double DEGREES = 57.29577951308232; /* per radian */

/* What stands at each point, found once. */
typedef struct plan {
    const kent_view *view;
    int *fitting; /* [point_count] -1: none of its own */
    int *group;   /* [point_count] the fitting it is a member of; -1 */
    int *note;    /* [point_count] -1: nothing said */
    int *pipe;    /* [point_count] pipe under which the point is told; -1: not yet */
    int *level, *outflow, *valve; /* [point_count] what stands there; -1: none */
    int *device; /* [point_count] the first of kent_model.devices; -1: none */
    int *next;   /* [device_count] the next one at the same point; -1 */
} plan;

static void fill_none(int *list, size_t count)
{
    for (size_t i = 0; i < count; i++) {
        list[i] = -1;
    }
}

static void plan_clear(plan *p)
{
    free(p->fitting);
    free(p->group);
    free(p->note);
    free(p->pipe);
    free(p->level);
    free(p->outflow);
    free(p->valve);
    free(p->device);
    free(p->next);
}

/* 0, or -1: no memory. */
static int plan_fill(plan *p)
{
    const kent_model *m = p->view->model;
    int **const lists[] = {&p->fitting, &p->group,   &p->note,  &p->pipe,
                           &p->level,   &p->outflow, &p->valve, &p->device};
    for (size_t i = 0; i < sizeof lists / sizeof lists[0]; i++) {
        *lists[i] = kent_alloc(m->point_count, sizeof **lists[i]);
        if (!*lists[i]) return -1;
        fill_none(*lists[i], m->point_count);
    }
    for (size_t i = 0; i < m->fitting_count; i++) {
        const kent_fitting *f = &m->fittings[i];
        if (f->point >= 0) p->fitting[f->point] = (int)i;
        for (size_t k = 0; k < f->member_count; k++) {
            p->group[m->members[f->member_first + k]] = (int)i;
        }
    }
    for (size_t i = 0; i < m->note_count; i++) {
        if (m->notes[i].point >= 0) p->note[m->notes[i].point] = (int)i;
    }
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        p->level[m->fixed_levels[i].point] = (int)i;
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        p->outflow[m->outflows[i].point] = (int)i;
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        p->valve[m->valves[i].point] = (int)i;
    }
    p->next = kent_alloc(m->device_count, sizeof *p->next);
    if (!p->next) return -1;
    for (size_t i = m->device_count; i-- > 0;) { /* so that each list rises */
        p->next[i] = p->device[m->devices[i].point];
        p->device[m->devices[i].point] = (int)i;
    }
    return 0;
}

static const char *said(const plan *p, kent_kind kind, double si, kent_shown *room)
{
    *room = kent_shown_with_unit(kind, p->view->units, si);
    return room->text;
}

/* ---- devices --------------------------------------------------------------------- */

static void add_level(const plan *p, const kent_fixed_level *f, kent_text *out)
{
    kent_shown s;
    kent_text_add(out, "fixed level %s", said(p, KENT_LENGTH, f->level, &s));
    if (f->loss > 0.0) kent_text_add(out, ", loss K %.3g out of it", f->loss);
    kent_text_add(out, "; ");
}

static void add_outflow(const plan *p, const kent_outflow *o, kent_text *out)
{
    kent_shown s;
    kent_text_add(out, "%s %s", o->flow < 0.0 ? "inflow" : "outflow",
                  said(p, KENT_FLOW, fabs(o->flow), &s));
    if (o->pressure_dependent) {
        kent_text_add(out, ", less where the pressure is below %s",
                      said(p, KENT_PRESSURE, o->full_pressure, &s));
    }
    kent_text_add(out, "; ");
}

static void add_valve(const plan *p, const kent_valve *a, kent_text *out)
{
    kent_shown s;
    kent_text_add(out, "valve %s, %s, %s, ", a->id, a->type,
                  said(p, KENT_DIAMETER, a->size, &s));
    if (a->opening <= 0.0) {
        kent_text_add(out, "closed");
    } else if (a->opening >= 1.0) {
        kent_text_add(out, "fully open");
    } else {
        kent_text_add(out, "open to %.2f", a->opening);
    }
    if (isfinite(a->discharge_level)) {
        kent_text_add(out, ", discharging to %s",
                      said(p, KENT_LENGTH, a->discharge_level, &s));
    } else {
        kent_text_add(out, ", in line");
    }
    if (isfinite(a->flow)) {
        kent_text_add(out, ", passing %s in steady flow",
                      said(p, KENT_FLOW, a->flow, &s));
    }
    kent_text_add(out, "; ");
}

/* ---- turns ----------------------------------------------------------------------- */

/* Standard bends; the last in US measures only. NFPA 24 (thrust table, the last from
 * memory); leaflets of ductile iron fittings, EN 545 sizes. */
static const double STANDARD_BENDS[] = {90.0, 45.0, 22.5, 11.25, 5.125};
enum { STANDARD_COUNT = sizeof STANDARD_BENDS / sizeof STANDARD_BENDS[0] };

/* Half a degree either way is taken up by the joints. Common practice, no source. */
static const double STANDARD_GAP = 0.5;

/* Degrees of the standard bend that a turn (degrees) is; 0: of none. */
static double standard_bend(double turn, kent_system units)
{
    const size_t count = units == KENT_US ? STANDARD_COUNT : STANDARD_COUNT - 1;
    for (size_t i = 0; i < count; i++) {
        if (fabs(turn - STANDARD_BENDS[i]) <= STANDARD_GAP) return STANDARD_BENDS[i];
    }
    return 0.0;
}

/* Degrees by which a bend turns upwards from its first port to its second. */
static double rise_of(const kent_model *m, const kent_fitting *f)
{
    const kent_port *port = &m->ports[f->port_first];
    const double before = asin(fmin(fmax(-port[0].direction.z, -1.0), 1.0));
    const double after = asin(fmin(fmax(port[1].direction.z, -1.0), 1.0));
    return (after - before) * DEGREES;
}

/* ", to the left" of a level bend; of one that also rises or falls both turns. Less
 * than a twentieth of a degree is none. */
static void add_parts(const kent_model *m, const kent_fitting *f, kent_text *out)
{
    const double turn = f->plan_turn * DEGREES;
    const double rise = f->port_count == 2 ? rise_of(m, f) : 0.0;
    const char *side = turn > 0.0 ? "left" : "right";
    if (fabs(turn) >= STANDARD_GAP && fabs(rise) >= STANDARD_GAP) {
        kent_text_add(out, ", %.1f° to the %s in plan and %.1f° %s in profile",
                      fabs(turn), side, fabs(rise), rise > 0.0 ? "up" : "down");
    } else if (fabs(turn) >= STANDARD_GAP) {
        kent_text_add(out, " to the %s", side);
    }
}

static void add_bend(const plan *p, const kent_fitting *f, kent_text *out)
{
    const double standard = standard_bend(f->angle * DEGREES, p->view->units);
    add_parts(p->view->model, f, out);
    if (f->within_deflection) {
        kent_text_add(out, ": the joint takes it, no fitting");
    } else if (standard > 0.0) {
        kent_text_add(out, ": a standard bend, %.5g°", standard);
    } else {
        kent_text_add(out, ": no standard bend, a made one or deflected joints");
    }
}

static void add_curve(const plan *p, const kent_fitting *f, kent_text *out)
{
    kent_shown s;
    if (isfinite(f->curve_radius)) {
        kent_text_add(out, ", radius %s", said(p, KENT_LENGTH, f->curve_radius, &s));
    }
    if (isfinite(f->curve_length)) {
        kent_text_add(out, ", %s along it", said(p, KENT_LENGTH, f->curve_length, &s));
    }
}

/* ": PI1, PI2" */
static void add_members(const plan *p, const kent_fitting *f, kent_text *out)
{
    const kent_model *m = p->view->model;
    for (size_t i = 0; i < f->member_count; i++) {
        kent_text_add(out, "%s%s", i > 0 ? ", " : ": ",
                      kent_view_point(m, m->members[f->member_first + i]));
    }
}

static void add_branch(const plan *p, const kent_branch *b, kent_text *out)
{
    kent_shown s;
    if (b->end == KENT_BRANCH_NONE) return;
    kent_text_add(out, "; a branch of %s outside diameter with %s joints, ",
                  said(p, KENT_DIAMETER, b->outside_diameter, &s),
                  kent_joint_word(b->joint));
    switch (b->end) {
    case KENT_BRANCH_NONE:
        break;
    case KENT_BRANCH_BLANK:
        kent_text_add(out, "blanked off");
        break;
    case KENT_BRANCH_VALVE:
        kent_text_add(out, "behind a closed valve");
        break;
    case KENT_BRANCH_OPEN:
        kent_text_add(out, "discharging");
        break;
    }
}

static void add_fitting(const plan *p, const kent_fitting *f, kent_text *out)
{
    const kent_model *m = p->view->model;
    const bool valve =
        f->type == KENT_VALVE && (f->valve >= 0 || f->device >= 0); /* told already */
    kent_text_add(out, "%s",
                  valve ? "pushed along the pipe when shut"
                        : kent_shown_fitting(m, f, p->view->units, KENT_ROOMY).text);
    switch (f->type) {
    case KENT_BEND:
        add_bend(p, f, out);
        break;
    case KENT_CURVE:
        add_curve(p, f, out);
        break;
    case KENT_TEE:
    case KENT_WYE:
    case KENT_CROSS:
    case KENT_REDUCER:
    case KENT_DEAD_END:
    case KENT_VALVE:
    case KENT_STRAIGHT:
    case KENT_GROUP:
        break;
    }
    add_members(p, f, out);
    add_branch(p, &f->branch, out);
}

/* ---- ground and restraint -------------------------------------------------------- */

/* Where a value of the ground at a fitting was said. */
static const char *said_by(bool note, bool point, bool zone)
{
    return note ? " (fittings)" : point ? " (its point)" : zone ? " (its zone)" : "";
}

static void add_ground(const plan *p, const kent_fitting *f, kent_text *out)
{
    const kent_model *m = p->view->model;
    const kent_fitting_note *note =
        f->point >= 0 && p->note[f->point] >= 0 ? &m->notes[p->note[f->point]] : NULL;
    const kent_point *point = f->point >= 0 ? &m->points[f->point] : NULL;
    const kent_ground_zone *zone = f->zone >= 0 ? &m->ground_zones[f->zone] : NULL;
    kent_shown s;
    if (f->soil < 0) {
        kent_text_add(out, " No soil stated,");
    } else {
        kent_text_add(out, " In %s%s,", m->soils[f->soil].id,
                      said_by(note && note->soil >= 0, point && point->soil >= 0,
                              zone && zone->soil >= 0));
    }
    if (isnan(f->cover)) {
        kent_text_add(out, " no cover stated,");
    } else {
        kent_text_add(
            out, " cover %s%s,", said(p, KENT_LENGTH, f->cover, &s),
            said_by(note && isfinite(note->cover),
                    point && (isfinite(point->cover) || isfinite(point->ground_level)),
                    zone && isfinite(zone->cover)));
    }
    const char *whose = said_by(false, point && !isnan(point->water_table),
                                zone && !isnan(zone->water_table));
    if (isnan(f->water_table)) {
        kent_text_add(out, " water table not stated");
    } else if (isinf(f->water_table)) {
        kent_text_add(out, " no ground water%s", whose);
    } else {
        kent_text_add(out, " ground water %s down%s",
                      said(p, KENT_LENGTH, f->water_table, &s), whose);
    }
    if (f->trench >= 0) {
        kent_text_add(out, ", trench %s%s", kent_trench_word(f->trench),
                      said_by(false, false, zone && zone->trench >= 0));
    }
    kent_text_add(out, ".");
}

static const char *why_restraint(const kent_fitting *f)
{
    if (f->within_deflection) return "since the joint takes the turn";
    if (f->role == KENT_ROLE_WALL) return "since the structure holds it";
    if (f->type == KENT_CURVE) return "since it leans on the ground beside it";
    switch (f->restraint) {
    case KENT_THRUST_BLOCK:
        return "since its joints may slip";
    case KENT_ANCHOR_BLOCK:
        return "since it is pushed along the pipe";
    case KENT_RESTRAINED_JOINTS:
        return "since its joints cannot slip";
    case KENT_BLOCK_AND_JOINTS: /* never by itself */
    case KENT_NO_RESTRAINT:
        return "as its type asks for";
    }
    return "";
}

static void add_restraint(const plan *p, const kent_fitting *f, kent_text *out)
{
    const kent_model *m = p->view->model;
    const int note = f->point >= 0 ? p->note[f->point] : -1;
    const bool asked = note >= 0 && m->notes[note].restraint >= 0;
    kent_text_add(out, " Restraint: %s, %s.", kent_restraint_word(f->restraint),
                  asked ? "as asked for" : why_restraint(f));
}

static void add_obstacles(const plan *p, const kent_fitting *f, kent_text *out)
{
    const kent_model *m = p->view->model;
    for (size_t i = 0; i < f->obstacle_count; i++) {
        const kent_obstacle *o = &m->obstacles[f->obstacle_first + i];
        const double azimuth = kent_thrust_azimuth(o->direction);
        kent_shown far, deep;
        kent_text_add(out, " Near it: %s, %s away towards %s, down to %s.", o->what,
                      said(p, KENT_LENGTH, o->distance, &far),
                      kent_shown_azimuth(p->view->units, azimuth, KENT_ROOMY).text,
                      said(p, KENT_LENGTH, o->depth, &deep));
    }
}

static void add_fitting_and_ground(const plan *p, const kent_fitting *f, kent_text *out)
{
    add_fitting(p, f, out);
    kent_text_add(out, ".");
    if (f->type != KENT_STRAIGHT) {
        add_ground(p, f, out);
        add_restraint(p, f, out);
    }
    kent_view_add_stated(p->view, f, out);
    add_obstacles(p, f, out);
}

/* ---- along the pipes ------------------------------------------------------------- */

static void add_stop(plan *p, size_t pipe, size_t stop, kent_text *words)
{
    const kent_model *m = p->view->model;
    const int point = m->route[stop];
    if (m->station_on[stop] != m->station[stop]) {
        kent_text_add(words, "counting goes on from %s; ",
                      kent_shown_station(p->view->units, m->station_on[stop]).text);
    }
    if (p->pipe[point] >= 0) {
        kent_text_add(words, "told under pipe %s.", m->pipes[p->pipe[point]].id);
        return;
    }
    p->pipe[point] = (int)pipe;
    if (p->level[point] >= 0) {
        add_level(p, &m->fixed_levels[p->level[point]], words);
    }
    if (p->outflow[point] >= 0) {
        add_outflow(p, &m->outflows[p->outflow[point]], words);
    }
    if (p->valve[point] >= 0) add_valve(p, &m->valves[p->valve[point]], words);
    for (int d = p->device[point]; d >= 0; d = p->next[d]) {
        kent_view_add_device(p->view, &m->devices[d], words);
        kent_text_add(words, "; ");
    }
    if (p->fitting[point] >= 0) {
        add_fitting_and_ground(p, &m->fittings[p->fitting[point]], words);
        return;
    }
    if (p->group[point] >= 0) {
        kent_text_add(words, "part of %s.", m->fittings[p->group[point]].id);
    } else {
        kent_text_add(words, "no fitting.");
    }
}

/* Columns that ids along a pipe take, at most 12. */
static int id_columns(const kent_model *m, const kent_pipe *a)
{
    enum { MOST = 12 };
    size_t widest = 0;
    for (size_t i = 0; i < a->route_count; i++) {
        const char *id = m->points[m->route[a->route_first + i]].id;
        const size_t columns = kent_text_columns(id);
        if (columns > widest) widest = columns;
    }
    return widest < MOST ? (int)widest : MOST;
}

/* "  1+198  T1  " */
static void add_lead(const plan *p, double station, const char *id, int columns,
                     kent_text *lead)
{
    const int blanks = columns - (int)kent_text_columns(id);
    kent_text_reset(lead);
    kent_text_add(lead, "  %-7s  %s%*s  ",
                  kent_shown_station(p->view->units, station).text, id,
                  blanks > 0 ? blanks : 0, "");
}

static void say_pipe(plan *p, size_t pipe)
{
    const kent_model *m = p->view->model;
    const kent_pipe *a = &m->pipes[pipe];
    const size_t last = a->route_first + a->route_count - 1;
    kent_text words = {0}, lead = {0};
    kent_shown s;
    kent_text_add(
        &words, "Pipe %s, %s from %s to %s", a->id,
        said(p, KENT_LENGTH, m->chainage[last] - m->chainage[a->route_first], &s),
        kent_view_point(m, m->route[a->route_first]),
        kent_view_point(m, m->route[last]));
    kent_view_say(p->view, "", &words);
    for (size_t stop = a->route_first; stop <= last; stop++) {
        add_lead(p, m->station[stop], kent_view_point(m, m->route[stop]),
                 id_columns(m, a), &lead);
        add_stop(p, pipe, stop, &words);
        kent_view_say(p->view, kent_text_of(&lead), &words);
        p->view->out->failed = p->view->out->failed || lead.failed;
    }
    kent_text_clear(&lead);
    kent_text_clear(&words);
}

static void say_ports_only(const plan *p)
{
    const kent_model *m = p->view->model;
    kent_text words = {0}, lead = {0};
    for (size_t i = 0; i < m->fitting_count; i++) {
        const kent_fitting *f = &m->fittings[i];
        if (f->point >= 0) continue;
        kent_text_reset(&lead);
        kent_text_add(&lead, "  %s  ", f->id);
        add_fitting_and_ground(p, f, &words);
        kent_text_add(&words, " Its %zu ports are stated.", f->port_count);
        kent_view_say(p->view, kent_text_of(&lead), &words);
        p->view->out->failed = p->view->out->failed || lead.failed;
    }
    kent_text_clear(&lead);
    kent_text_clear(&words);
}

/* ---- a large main ---------------------------------------------------------------- */

enum { TYPES = KENT_GROUP + 1, EXCEPTIONS = 40 };

static void say_counts(const plan *p)
{
    const kent_model *m = p->view->model;
    size_t count[TYPES] = {0};
    kent_text words = {0};
    for (size_t i = 0; i < m->fitting_count; i++) {
        count[m->fittings[i].type]++;
    }
    kent_text_add(&words, "%zu points, %zu pipe%s, %zu fittings:", m->point_count,
                  m->pipe_count, m->pipe_count == 1 ? "" : "s", m->fitting_count);
    const char *gap = " ";
    for (int t = 0; t < TYPES; t++) {
        if (count[t] == 0) continue;
        kent_text_add(&words, "%s%zu × %s", gap, count[t],
                      kent_fitting_type_word((kent_fitting_type)t));
        gap = ", ";
    }
    kent_text_add(&words, ". Too many to tell one by one: below stand those that are "
                          "out of the ordinary; --wide tells all.");
    kent_view_say(p->view, "", &words);
    kent_text_clear(&words);
}

/* What somebody wants to look at: no ground to count on, no standard bend, or
 * something said of it in the list of fittings. */
static bool out_of_the_ordinary(const plan *p, const kent_fitting *f)
{
    const kent_model *m = p->view->model;
    const bool held = f->restraint != KENT_NO_RESTRAINT;
    if (f->point < 0 || p->note[f->point] >= 0 || f->role != KENT_ROLE_NONE) {
        return true;
    }
    if (held && (f->soil < 0 || m->soils[f->soil].unreliable || isnan(f->cover))) {
        return true;
    }
    return f->type == KENT_GROUP ||
           (f->type == KENT_BEND && !f->within_deflection &&
            standard_bend(f->angle * DEGREES, p->view->units) <= 0.0);
}

static void say_exceptions(const plan *p)
{
    const kent_model *m = p->view->model;
    kent_text words = {0}, lead = {0};
    size_t found = 0;
    for (size_t i = 0; i < m->fitting_count; i++) {
        const kent_fitting *f = &m->fittings[i];
        if (!out_of_the_ordinary(p, f)) continue;
        if (++found > EXCEPTIONS) continue;
        add_lead(p, f->station, f->id, 0, &lead);
        add_fitting_and_ground(p, f, &words);
        kent_view_say(p->view, kent_text_of(&lead), &words);
        p->view->out->failed = p->view->out->failed || lead.failed;
    }
    if (found > EXCEPTIONS) {
        kent_text_add(&words, "and %zu more of these.", found - EXCEPTIONS);
        kent_view_say(p->view, "  ", &words);
    }
    kent_text_clear(&lead);
    kent_text_clear(&words);
}

void kent_view_plan(const kent_view *v)
{
    const kent_model *m = v->model;
    plan p = {.view = v};
    if (plan_fill(&p)) {
        v->out->failed = true;
    } else if (kent_view_whole(v, m->point_count)) {
        kent_text_add(v->out, "\nThe main, point by point\n");
        for (size_t i = 0; i < m->pipe_count; i++) {
            say_pipe(&p, i);
        }
        say_ports_only(&p);
    } else {
        kent_text_add(v->out, "\nThe main in short\n");
        say_counts(&p);
        say_exceptions(&p);
    }
    plan_clear(&p);
}

void kent_view_points(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_shown unit = kent_shown_unit(KENT_LENGTH, v->units);
    const char *metre = unit.text;
    enum { FIXED = 6 };
    const size_t states = kent_view_states(v);
    const size_t count = FIXED + states;
    kent_shown *names = kent_alloc(states, sizeof *names);
    kent_column *columns = kent_alloc(count, sizeof *columns);
    double *head = kent_alloc(m->point_count, states * sizeof *head);
    if (!names || !columns || !head) {
        v->out->failed = true;
        goto done;
    }
    if (!kent_view_whole(v, m->point_count)) goto done;
    columns[0] = (kent_column){"point", "", KENT_ALIGN_LEFT, true};
    columns[1] = (kent_column){"x", metre, KENT_ALIGN_RIGHT, false};
    columns[2] = (kent_column){"y", metre, KENT_ALIGN_RIGHT, false};
    columns[3] = (kent_column){"z", metre, KENT_ALIGN_RIGHT, false};
    columns[4] = (kent_column){"ground", metre, KENT_ALIGN_RIGHT, false};
    columns[5] = (kent_column){"cover", metre, KENT_ALIGN_RIGHT, false};
    for (size_t s = 0; s < states; s++) {
        names[s] = kent_view_in_state(v, "steady head", s);
        columns[FIXED + s] =
            (kent_column){names[s].text, metre, KENT_ALIGN_RIGHT, true};
        double *of = head + s * m->point_count;
        for (size_t i = 0; i < m->point_count; i++) {
            of[i] = NAN;
        }
        if (kent_view_steady(v, s)) {
            kent_point_steady_heads(m, kent_view_steady(v, s), of);
        }
    }
    kent_table t = {.columns = columns, .column_count = count};
    bool laid = false;
    for (size_t i = 0; i < m->point_count; i++) {
        const kent_point *p = &m->points[i];
        laid |= p->laid_out;
        kent_view_word(&t, p->id);
        kent_view_quantity(v, &t, KENT_LENGTH, p->at.x);
        kent_view_quantity(v, &t, KENT_LENGTH, p->at.y);
        kent_view_quantity(v, &t, KENT_LENGTH, p->at.z);
        kent_view_quantity(v, &t, KENT_LENGTH, p->ground_level);
        kent_view_quantity(v, &t, KENT_LENGTH, p->cover);
        for (size_t s = 0; s < states; s++) {
            kent_view_quantity(v, &t, KENT_LENGTH, head[s * m->point_count + i]);
        }
    }
    kent_view_finish(v,
                     laid ? "Points, x and y worked out from stations and turns"
                          : "Points, as given",
                     &t);
done:
    free(head);
    free(columns);
    free(names);
}
