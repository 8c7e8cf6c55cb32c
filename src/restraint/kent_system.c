/* Which restrained lengths meet, and what stretches they cover together. */
#include "kent_side_internal.h"
#include "kent_system_internal.h"

#include <stdlib.h>

/* ---- legs ------------------------------------------------------------------------ */

static bool add_leg(kent_system_work *w, size_t fitting, size_t leg, size_t port,
                    double length)
{
    const kent_fitting *f = &w->m->fittings[fitting];
    const kent_port *p = &w->m->ports[f->port_first + port];

    if (w->leg_count == w->leg_capacity) {
        void *grown = w->legs;
        if (kent_grow(&grown, &w->leg_capacity, w->leg_count + 1, sizeof *w->legs)) {
            return false;
        }
        w->legs = grown;
    }
    w->legs[w->leg_count++] = (kent_system_leg){
        .fitting = fitting,
        .leg = leg,
        .way = kent_along_of(w->m, p),
        .walk = kent_leg_walk_of(w->m, w->standings, fitting, p, length, 0.0),
        .toward = SIZE_MAX,
    };
    return true;
}

/* Of a reducer, the leg that is drawn and fits: that of the wider pipe first. */
static size_t leg_chosen(const kent_model *m, const kent_fitting *f,
                         const kent_holding *h)
{
    size_t best = 0;

    for (size_t i = 1; i < h->leg_count; i++) {
        const kent_port *a = &m->ports[f->port_first + h->legs[best].port];
        const kent_port *b = &m->ports[f->port_first + h->legs[i].port];
        const bool wider = b->seal_diameter > a->seal_diameter;
        if (h->legs[i].fits == h->legs[best].fits ? wider : h->legs[i].fits) best = i;
    }
    return best;
}

static bool add_run(kent_system_work *w, size_t fitting)
{
    const kent_fitting *f = &w->m->fittings[fitting];

    for (size_t k = 0; k < 2; k++) {
        const double length = f->stated.run_length[k];
        if (!(length > 0.0) || w->m->ports[f->port_first + k].span < 0) continue;
        if (!add_leg(w, fitting, SIZE_MAX, k, length)) return false;
    }
    return true;
}

static bool collect(kent_system_work *w)
{
    w->leg_count = 0;
    for (size_t i = 0; i < w->r->fitting_count; i++) {
        const kent_fitting *f = &w->m->fittings[i];
        const kent_holding *h = &w->r->fittings[i];
        const bool joints =
            h->chosen == KENT_RESTRAINED_JOINTS || h->chosen == KENT_BLOCK_AND_JOINTS;
        if (!joints || h->needs_nothing || h->leg_count == 0) continue;
        const bool either = kent_leg_rule_of(w->m, f)->either;
        const size_t first = either ? leg_chosen(w->m, f, h) : 0;
        const size_t end = either ? first + 1 : h->leg_count;
        for (size_t k = first; k < end; k++) {
            if (!add_leg(w, i, k, h->legs[k].port, h->legs[k].reach)) return false;
        }
        const bool run = f->type == KENT_TEE && !kent_fitting_has_shut_legs(w->m, f);
        if (run && !add_run(w, i)) return false;
    }
    return true;
}

/* ---- which meet ------------------------------------------------------------------ */

/* A stretch of one leg, on one pipe. */
typedef struct covered {
    size_t leg, system;
    int pipe;
    double from, to;
} covered;

static int covered_compare(const void *left, const void *right)
{
    const covered *a = left, *b = right;

    if (a->system != b->system) return a->system < b->system ? -1 : 1;
    if (a->pipe != b->pipe) return a->pipe < b->pipe ? -1 : 1;
    if (a->from < b->from) return -1;
    if (a->from > b->from) return 1;
    return (a->leg > b->leg) - (a->leg < b->leg);
}

static size_t root_of(size_t *roots, size_t i)
{
    while (roots[i] != i) {
        roots[i] = roots[roots[i]];
        i = roots[i];
    }
    return i;
}

/* The lower index is the root, so that a system goes by its first fitting. */
static void unite(size_t *roots, size_t a, size_t b)
{
    const size_t x = root_of(roots, a), y = root_of(roots, b);
    roots[x > y ? x : y] = x < y ? x : y;
}

/* Every stretch of every leg; NULL: no memory. */
static covered *cover(const kent_system_work *w, size_t *count)
{
    covered *all = kent_alloc(w->leg_count * KENT_LEG_RUNS + 1, sizeof *all);

    *count = 0;
    for (size_t i = 0; all && i < w->leg_count; i++) {
        const kent_leg_walk *walk = &w->legs[i].walk;
        for (size_t k = 0; k < walk->run_count; k++) {
            const kent_leg_run *run = &walk->run[k];
            all[(*count)++] =
                (covered){i, w->legs[i].system, run->pipe, run->from, run->to};
        }
    }
    if (all && *count > 0) qsort(all, *count, sizeof *all, covered_compare);
    return all;
}

static int leg_compare(const void *left, const void *right)
{
    const kent_system_leg *a = left, *b = right;

    if (a->system != b->system) return a->system < b->system ? -1 : 1;
    if (a->fitting != b->fitting) return a->fitting < b->fitting ? -1 : 1;
    return (a->leg > b->leg) - (a->leg < b->leg);
}

/* Gives legs that meet or overlap the same system: their first fitting's index. */
static bool join(kent_system_work *w)
{
    size_t count = 0;
    covered *all = NULL;

    for (size_t i = 0; i < w->leg_count; i++) {
        w->legs[i].system = 0; /* all in one row, by pipe */
    }
    all = cover(w, &count);
    if (!all) return false;
    for (size_t i = 0; i < w->r->fitting_count; i++) {
        w->roots[i] = i;
    }
    double to = -INFINITY;
    for (size_t i = 0; i < count; i++) {
        const bool on = i > 0 && all[i].pipe == all[i - 1].pipe;
        if (on && all[i].from <= to + KENT_SAME_PLACE) {
            unite(w->roots, w->legs[all[i].leg].fitting,
                  w->legs[all[i - 1].leg].fitting);
        } else {
            to = -INFINITY;
        }
        to = fmax(to, all[i].to);
    }
    for (size_t i = 0; i < w->leg_count; i++) {
        w->legs[i].system = root_of(w->roots, w->legs[i].fitting);
    }
    free(all);
    if (w->leg_count > 0) qsort(w->legs, w->leg_count, sizeof *w->legs, leg_compare);
    return true;
}

size_t kent_system_legs(const kent_system_work *w, size_t first)
{
    size_t end = first;

    while (end < w->leg_count && w->legs[end].system == w->legs[first].system) {
        end++;
    }
    return end - first;
}

/* ---- stretches ------------------------------------------------------------------- */

/* Whether a fitting of the system stands at a chainage of a pipe. */
static bool stands_at(const kent_system_leg *legs, size_t count, int pipe, double at)
{
    for (size_t i = 0; i < count; i++) {
        const kent_along way = legs[i].way;
        if (way.pipe == pipe && fabs(way.at - at) <= KENT_SAME_PLACE) return true;
    }
    return false;
}

/* The next fitting of the system beyond a chainage of a pipe, at most `end`. */
static double next_standing(const kent_system_leg *legs, size_t count, int pipe,
                            double from, double end)
{
    double next = end;

    for (size_t i = 0; i < count; i++) {
        const kent_along way = legs[i].way;
        if (way.pipe == pipe && way.at > from + KENT_SAME_PLACE) {
            next = fmin(next, way.at);
        }
    }
    return next;
}

/* Joints to restrain on a stretch: at every fitting of the system, and between its
 * pipes; where it leads in from another pipe, the one between these. source 22.1 */
static int joints_of(const kent_model *m, const kent_system_leg *legs, size_t count,
                     const kent_stretch *s)
{
    const double laying = m->pipes[s->pipe].laying_length;
    const double whole = kent_pipe_laid(m, s->pipe);
    double joints = 0.0;

    if (!(laying > 0.0)) return 0;
    for (double from = s->from; from < s->to - KENT_SAME_PLACE;) {
        const double to = next_standing(legs, count, s->pipe, from, s->to);
        kent_along on;
        const kent_along back = {s->pipe, false, from};
        const bool begins = stands_at(legs, count, s->pipe, from) ||
                            (from <= KENT_SAME_PLACE && kent_along_on(m, back, &on) &&
                             on.pipe < s->pipe);
        const kent_along ahead = {s->pipe, true, to};
        const bool ends = stands_at(legs, count, s->pipe, to) ||
                          (to >= whole - KENT_SAME_PLACE &&
                           kent_along_on(m, ahead, &on) && on.pipe < s->pipe);
        joints += ceil((to - from) / laying - KENT_SIDE_SLACK);
        if (begins && ends) joints += 1.0;
        from = to;
    }
    return (int)joints;
}

static void stretch_close(const kent_system_work *w, const kent_system_leg *legs,
                          size_t count, kent_system_of *system, kent_stretch *s)
{
    s->station_from = kent_model_station_at(w->m, s->pipe, s->from);
    s->station_to = kent_model_station_at(w->m, s->pipe, s->to);
    s->joints = joints_of(w->m, legs, count, s);
    system->length += s->to - s->from;
    system->joints += s->joints;
}

/* Joints of all stretches; not known where they are not of one. */
static int joints_in_all(const kent_systems *s, const kent_system_of *system)
{
    for (size_t i = 0; i < system->stretch_count; i++) {
        if (s->stretches[system->stretch_first + i].joints == 0) return 0;
    }
    return system->joints;
}

/* One system's row: its fittings and stretches. at: its first stretch's, sorted. */
static size_t fill(kent_system_work *w, const covered *all, size_t count, size_t at,
                   const kent_system_leg *legs, size_t leg_count)
{
    kent_systems *s = &w->r->systems;
    kent_system_of *system = &s->at[s->count++];

    *system = (kent_system_of){.fitting_first = s->fitting_count,
                               .stretch_first = s->stretch_count,
                               .outer_first = s->outer_count,
                               .needed = NAN,
                               .given = NAN};
    for (size_t i = 0; i < leg_count; i++) {
        if (i > 0 && legs[i].fitting == legs[i - 1].fitting) continue;
        s->fittings[s->fitting_count++] = legs[i].fitting;
        system->fitting_count++;
    }
    while (at < count && all[at].system == legs[0].system) {
        kent_stretch *stretch = &s->stretches[s->stretch_count++];
        *stretch = (kent_stretch){
            .pipe = all[at].pipe, .from = all[at].from, .to = all[at].to};
        system->stretch_count++;
        for (at++; at < count && all[at].system == legs[0].system &&
                   all[at].pipe == stretch->pipe &&
                   all[at].from <= stretch->to + KENT_SAME_PLACE;
             at++) {
            stretch->to = fmax(stretch->to, all[at].to);
        }
        stretch_close(w, legs, leg_count, system, stretch);
    }
    system->joints = joints_in_all(s, system);
    return at;
}

/* The rows of all systems, in memory of their own. */
static bool lay_out(kent_system_work *w)
{
    kent_systems *s = &w->r->systems;
    size_t count = 0, at = 0;
    covered *all = cover(w, &count);

    kent_systems_clear(s);
    s->at = kent_alloc(w->leg_count + 1, sizeof *s->at);
    s->fittings = kent_alloc(w->leg_count + 1, sizeof *s->fittings);
    s->stretches = kent_alloc(count + 1, sizeof *s->stretches);
    s->outers = kent_alloc(w->leg_count + 1, sizeof *s->outers);
    const bool got = all && s->at && s->fittings && s->stretches && s->outers;
    for (size_t i = 0; got && i < w->leg_count;) {
        const size_t legs = kent_system_legs(w, i);
        at = fill(w, all, count, at, &w->legs[i], legs);
        i += legs;
    }
    free(all);
    return got;
}

/* ---- what stands next on a leg's way --------------------------------------------- */

/* The stretch of a system around a chainage of a pipe; NULL: none. */
static const kent_stretch *stretch_at(const kent_systems *s, const kent_system_of *of,
                                      int pipe, double at)
{
    for (size_t i = 0; i < of->stretch_count; i++) {
        const kent_stretch *k = &s->stretches[of->stretch_first + i];
        const bool on = at > k->from - KENT_SAME_PLACE && at < k->to + KENT_SAME_PLACE;
        if (k->pipe == pipe && on) return k;
    }
    return NULL;
}

/* The nearest fitting of the system on a way within a length (m). */
static void nearest(const kent_system_leg *legs, size_t count, kent_along way,
                    double length, double passed, kent_system_leg *leg)
{
    double best = length + KENT_SAME_PLACE;

    for (size_t i = 0; i < count; i++) {
        const kent_along other = legs[i].way;
        const double away = way.ahead ? other.at - way.at : way.at - other.at;
        if (other.pipe != way.pipe || legs[i].fitting == leg->fitting) continue;
        if (away < -KENT_SAME_PLACE || !(away < best)) continue;
        best = away;
        leg->toward = legs[i].fitting;
        leg->away = passed + away;
    }
}

static void look_along(const kent_system_work *w, const kent_system_of *of,
                       const kent_system_leg *legs, size_t count, kent_system_leg *leg)
{
    kent_along way = leg->way;

    leg->toward = SIZE_MAX;
    leg->away = 0.0;
    for (size_t pipes = 0; pipes < KENT_LEG_RUNS; pipes++) {
        const kent_stretch *s = stretch_at(&w->r->systems, of, way.pipe, way.at);
        if (!s) return;
        const double end = way.ahead ? s->to : s->from;
        const double length = fabs(end - way.at);
        nearest(legs, count, way, length, leg->away, leg);
        if (leg->toward != SIZE_MAX) return;
        leg->away += length;
        if (length < kent_along_left(w->m, way) - KENT_SAME_PLACE) return;
        if (!kent_along_on(w->m, way, &way)) return;
    }
}

static void look_around(kent_system_work *w)
{
    size_t system = 0;

    for (size_t i = 0; i < w->leg_count; system++) {
        const size_t count = kent_system_legs(w, i);
        for (size_t k = 0; k < count; k++) {
            look_along(w, &w->r->systems.at[system], &w->legs[i], count,
                       &w->legs[i + k]);
        }
        i += count;
    }
}

/* ---- all ------------------------------------------------------------------------- */

enum { ROUNDS = 8 }; /* longer legs may meet further ones, whose system turns more */

static bool lay_all(kent_system_work *w)
{
    if (!collect(w) || !join(w) || !lay_out(w)) return false;
    look_around(w);
    return true;
}

kent_status kent_systems_find(const kent_model *m, const kent_standings *standings,
                              kent_restraints *r, kent_error *err)
{
    kent_system_work w = {.m = m, .standings = standings, .r = r};
    bool done = false;

    w.roots = kent_alloc(r->fitting_count + 1, sizeof *w.roots);
    done = w.roots && lay_all(&w);
    for (int round = 0; done && round < ROUNDS && kent_system_lengthen(&w); round++) {
        done = lay_all(&w);
    }
    if (done) done = kent_system_tell(&w);
    free(w.roots);
    free(w.legs);
    return done ? KENT_OK : kent_error_nomem(err);
}

void kent_systems_clear(kent_systems *s)
{
    free(s->at);
    free(s->fittings);
    free(s->stretches);
    free(s->outers);
    *s = (kent_systems){0};
}
