#include "kent_model_internal.h"

#include <math.h>
#include <stdlib.h>

#include "kent_said.h"

/* A route that closes on a point already laid out may miss it by this share of its
 * length, and by as much as stations are rounded, m. */
static const double CLOSURE = 0.01, CLOSURE_ROUNDING = 0.1;
static const double STRAIGHT_BACK = 3.1; /* rad: no arc turns so far in one point */

/* Pipes being laid out in plan. */
typedef struct alignment {
    kent_model *m;
    const kent_layout *l;
    kent_complaints *complaints;
    bool *wanted;    /* [pipe_count] has stations and no x, y */
    bool *done;      /* [pipe_count] laid out, or complained of */
    bool *ahead;     /* [point_count] a wanted pipe comes there before it goes on */
    bool *turned;    /* [point_count] its turn was used */
    double *heading; /* [point_count] rad from +x, + to the left, of what arrives */
    int *tree;       /* [point_count] of pipes laid out from one start; -1: not yet */
    int *queue;      /* [pipe_count] */
    size_t queued;
} alignment;

static kent_point *point_of(const kent_model *m, size_t stop)
{
    return &m->points[m->route[stop]];
}

static double zero_if_none(double x) { return isnan(x) ? 0.0 : x; }

/* ---- which pipes ----------------------------------------------------------------- */

static bool is_wanted(const kent_model *m, const kent_pipe *pipe)
{
    bool turns = !isnan(pipe->branch_turn);
    bool stations = true;
    for (size_t k = 0; k < pipe->route_count; k++) {
        const kent_point *point = point_of(m, pipe->route_first + k);
        if (!isnan(point->at.x) || !isnan(point->at.y)) return false;
        turns |= !isnan(point->turn);
        stations &= k == 0 || !isnan(point->station);
    }
    if (pipe->route_count == 2 && !isnan(pipe->length)) return turns;
    return stations;
}

/* ---- along one pipe -------------------------------------------------------------- */

/* Equation 5.10: what the tangents at a point are longer than its arc, m. */
static double curve_excess(const kent_point *point)
{
    if (isnan(point->curve_radius)) return 0.0;
    const double turn = fabs(zero_if_none(point->turn));
    return point->curve_radius * (2.0 * tan(0.5 * turn) - turn);
}

/* The station that counting goes on from at a stop of this pipe. */
static double station_on(const alignment *a, const kent_pipe *pipe, size_t stop)
{
    const kent_point *point = point_of(a->m, stop);
    if (stop == pipe->route_first && kent_route_follows(a->m, a->l, pipe) < 0) {
        return 0.0; /* a branch */
    }
    return isnan(point->station_ahead) ? point->station : point->station_ahead;
}

/* m, level, of the leg that ends at a stop; by the pipe's length where that is all
 * there is. used m of it are taken by the legs before. NAN: not to be known.
 * Equation 5.9. */
static double level_distance(const alignment *a, const kent_pipe *pipe, size_t stop,
                             double used)
{
    const kent_model *m = a->m;
    const kent_point *point = point_of(m, stop);
    const bool last = stop + 1 == pipe->route_first + pipe->route_count;
    const bool placed = a->tree[m->route[stop]] >= 0;
    const bool lone = pipe->route_count == 2 && isnan(point->station);

    if (!isnan(pipe->length) && last && (placed || lone)) {
        const double slope = pipe->length - used;
        const double rise = point->at.z - point_of(m, stop - 1)->at.z;
        return slope > fabs(rise) ? sqrt(slope * slope - rise * rise) : 0.0;
    }
    if (placed) return (double)NAN; /* its station is another pipe's */
    const kent_point *before = point_of(m, stop - 1);
    const double excess = stop - 1 > pipe->route_first ? curve_excess(before) : 0.0;
    return point->station - station_on(a, pipe, stop - 1) + excess;
}

static void close_on(alignment *a, const kent_pipe *pipe, size_t stop, double heading,
                     double distance, double level_length)
{
    kent_model *m = a->m;
    const kent_vec3 from = point_of(m, stop - 1)->at, to = point_of(m, stop)->at;
    const kent_vec3 leg = {to.x - from.x, to.y - from.y, 0.0};
    const kent_vec3 way = {cos(heading), sin(heading), 0.0};
    const double along =
        isnan(distance) ? fmax(kent_vec3_dot(leg, way), 0.0) : distance;
    const double gap =
        kent_vec3_length(kent_vec3_sub(leg, kent_vec3_scale(along, way)));

    if (gap <= fmax(CLOSURE * (level_length + along), CLOSURE_ROUNDING)) return;
    kent_notes_add(
        &m->cautions,
        "pipe \"%s\" by its stations and turns misses \"%s\" by %s; its last "
        "leg is led there all the same: look at its stations, turns and "
        "branch_turn",
        pipe->id, point_of(m, stop)->id, kent_said_of(KENT_LENGTH, m->units, gap).s);
}

/* Whether a pipe may come to a point that is laid out already: there it ends. */
static bool may_meet(const alignment *a, const kent_pipe *pipe, size_t stop)
{
    const kent_model *m = a->m;
    const int tree = a->tree[m->route[stop]];
    const bool last = stop + 1 == pipe->route_first + pipe->route_count;
    if (tree < 0 || (last && tree == a->tree[m->route[pipe->route_first]])) return true;
    kent_place_complain(m, pipe->place, a->complaints,
                        "pipe \"%s\" comes to \"%s\", which other stations and turns "
                        "place already; without x and y let a pipe start there, with "
                        "branch_turn, or end there having started on the same main",
                        pipe->id, point_of(m, stop)->id);
    return false;
}

static void lay_legs(alignment *a, const kent_pipe *pipe, double heading)
{
    kent_model *m = a->m;
    const int tree = a->tree[m->route[pipe->route_first]];
    double used = 0.0, level_length = 0.0; /* m: in space, and level */

    for (size_t k = 1; k < pipe->route_count; k++) {
        const size_t stop = pipe->route_first + k;
        const int number = m->route[stop];
        kent_point *point = point_of(m, stop);
        const kent_point *before = point_of(m, stop - 1);
        const double rise = point->at.z - before->at.z;
        const double distance = level_distance(a, pipe, stop, used);

        if (!may_meet(a, pipe, stop)) return;
        if (a->tree[number] >= 0) {
            close_on(a, pipe, stop, heading, distance, level_length);
            return;
        }
        if (isnan(distance)) {
            kent_place_complain(m, point->place, a->complaints,
                                "pipe \"%s\": neither x and y nor stations say how far "
                                "\"%s\" is from \"%s\"; give both a station",
                                pipe->id, point->id, before->id);
            return;
        }
        if (distance < 0.0 || (distance == 0.0 && rise == 0.0)) {
            kent_route_complain_falling(m, pipe, stop, station_on(a, pipe, stop - 1),
                                        point->station, a->complaints);
            return;
        }
        point->at.x = before->at.x + distance * cos(heading);
        point->at.y = before->at.y + distance * sin(heading);
        point->laid_out = true;
        a->tree[number] = tree;
        a->heading[number] = heading;
        used += hypot(distance, rise);
        level_length += distance;
        if (k + 1 == pipe->route_count) return;
        const double turn = zero_if_none(point->turn);
        if (!isnan(point->curve_radius) && fabs(turn) > STRAIGHT_BACK) {
            kent_place_complain(m, point->place, a->complaints,
                                "point \"%s\": no curve turns straight back; divide it "
                                "over several points",
                                point->id);
            return;
        }
        heading += turn;
        a->turned[number] = true;
    }
}

/* ---- from pipe to pipe ----------------------------------------------------------- */

static void lay_pipe(alignment *a, int index, int tree)
{
    kent_model *m = a->m;
    const kent_pipe *pipe = &m->pipes[index];
    const int start = m->route[pipe->route_first];

    a->done[index] = true;
    if (a->tree[start] < 0) {
        kent_point *point = &m->points[start];
        point->at.x = point->at.y = 0.0;
        point->laid_out = true;
        a->tree[start] = tree;
        a->heading[start] = 0.0;
        lay_legs(a, pipe, 0.0);
        return;
    }
    if (!isnan(pipe->branch_turn)) {
        lay_legs(a, pipe, a->heading[start] + pipe->branch_turn);
    } else if (kent_route_follows(m, a->l, pipe) >= 0) {
        a->turned[start] = true;
        lay_legs(a, pipe, a->heading[start] + zero_if_none(m->points[start].turn));
    } else {
        kent_place_complain(
            m, pipe->place, a->complaints,
            "pipe \"%s\" branches off at \"%s\"; without x and y say "
            "which way: branch_turn = \"90 deg left\", against the pipe "
            "that runs there",
            pipe->id, m->points[start].id);
    }
}

static void queue_from(alignment *a, const kent_pipe *pipe)
{
    const kent_model *m = a->m;
    for (size_t k = 0; k < pipe->route_count; k++) {
        const int point = m->route[pipe->route_first + k];
        if (a->tree[point] < 0) continue;
        for (size_t i = a->l->first[point]; i < a->l->first[point + 1]; i++) {
            const size_t stop = a->l->stop[i];
            const int other = a->l->pipe[stop];
            if (stop != m->pipes[other].route_first) continue;
            if (!a->wanted[other] || a->done[other]) continue;
            a->done[other] = true; /* queued but once */
            a->queue[a->queued++] = other;
        }
    }
}

/* A pipe, all that start on it, and so on. */
static void lay_tree(alignment *a, int root, int tree)
{
    a->queued = 0;
    a->queue[a->queued++] = root;
    a->done[root] = true;
    for (size_t head = 0; head < a->queued; head++) {
        lay_pipe(a, a->queue[head], tree);
        queue_from(a, &a->m->pipes[a->queue[head]]);
    }
}

static void lay_all(alignment *a)
{
    const kent_model *m = a->m;
    const size_t before = a->complaints->count;
    int tree = 0;
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *pipe = &m->pipes[i];
        if (!a->wanted[i] || a->ahead[m->route[pipe->route_first]]) continue;
        if (!a->done[i]) lay_tree(a, (int)i, tree++);
    }
    if (tree > 0) {
        kent_notes_add(&a->m->assumed, "%s\t%s\t%s", "x and y of the main",
                       "from stations and turns",
                       "its first pipe starts at 0, 0 and runs along +x");
    }
    for (size_t i = 0; i < m->pipe_count; i++) { /* rings */
        if (a->complaints->count > before) return;
        if (a->wanted[i] && !a->done[i]) lay_tree(a, (int)i, tree++);
    }
    if (tree > 1) {
        kent_notes_add(
            &a->m->cautions,
            "%d mains are laid out from stations and turns, each from 0, 0 along +x: "
            "how they lie to each other is not known; give x and y where it matters",
            tree);
    }
}

static void complain_unused_turns(const alignment *a)
{
    const kent_model *m = a->m;
    for (size_t p = 0; p < m->point_count; p++) {
        if (isnan(m->points[p].turn) || a->turned[p]) continue;
        kent_place_complain(
            m, m->points[p].place, a->complaints,
            "point \"%s\": its turn says nothing; it is for points past "
            "which a route runs on whose points have stations and no x "
            "and y: give those, or leave it out",
            m->points[p].id);
    }
}

static kent_status start(alignment *a)
{
    const kent_model *m = a->m;
    a->wanted = kent_alloc(m->pipe_count, sizeof *a->wanted);
    a->done = kent_alloc(m->pipe_count, sizeof *a->done);
    a->ahead = kent_alloc(m->point_count, sizeof *a->ahead);
    a->turned = kent_alloc(m->point_count, sizeof *a->turned);
    a->heading = kent_alloc(m->point_count, sizeof *a->heading);
    a->tree = kent_alloc(m->point_count, sizeof *a->tree);
    a->queue = kent_alloc(m->pipe_count, sizeof *a->queue);
    if (!a->wanted || !a->done || !a->ahead || !a->turned || !a->heading || !a->tree ||
        !a->queue) {
        return KENT_E_NOMEM;
    }
    for (size_t p = 0; p < m->point_count; p++) {
        a->tree[p] = -1;
    }
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *pipe = &m->pipes[i];
        a->wanted[i] = is_wanted(m, pipe);
        for (size_t k = 1; a->wanted[i] && k < pipe->route_count; k++) {
            a->ahead[m->route[pipe->route_first + k]] = true;
        }
    }
    return KENT_OK;
}

kent_status kent_alignment_lay(kent_model *m, const kent_layout *l,
                               kent_complaints *complaints)
{
    alignment a = {.m = m, .l = l, .complaints = complaints};
    const size_t before = complaints->count;
    const kent_status status = start(&a);

    if (status == KENT_OK) {
        lay_all(&a);
        if (complaints->count == before) complain_unused_turns(&a);
    }
    free(a.wanted);
    free(a.done);
    free(a.ahead);
    free(a.turned);
    free(a.heading);
    free(a.tree);
    free(a.queue);
    return status;
}

void kent_alignment_forget(kent_model *m)
{
    for (size_t p = 0; p < m->point_count; p++) {
        kent_point *point = &m->points[p];
        if (!point->laid_out) continue;
        point->at.x = point->at.y = (double)NAN;
        point->laid_out = false;
    }
}
