/* Who stands near whom: footprints sorted into cells of a grid, each as wide as the
 * widest of them, so that what can meet lies in the same cell or beside it. */
#include "kent_space.h"
#include "kent_convex.h"
#include "kent_said.h"
#include "kent_space_internal.h"

#include <assert.h>
#include <stdlib.h>

/* m2, and share of a wedge: less is two figures that touch. */
static const double TOUCH = 1e-6;

/* m of a restrained length beside which other mains are looked for. Common practice, no
 * source: far from the fitting the push on the trench's side fades. */
static const double BESIDE = 30.0;

/* What is told of one fitting before the rest is only counted. */
enum { TOLD = 4, GROUNDS = 4 }; /* all sides of a block; two of it, and two legs */

typedef struct item {
    size_t fitting;
    double x, y, radius;
    long long column, row;       /* of the grid */
    kent_convex body;            /* count 0: no concrete */
    kent_convex ground[GROUNDS]; /* that it leans on */
    size_t ground_count;
    double ground_area; /* m2 */
    size_t stretch;     /* last stretch of pipe that was looked at, + 1 */
} item;

typedef struct finder {
    const kent_model *m;
    kent_restraints *r;
    item *items; /* [count] by cell */
    size_t count;
    double cell; /* m */
    size_t capacity;
    bool failed;
} finder;

/* ---- figures --------------------------------------------------------------------- */

static void item_ground(item *it, kent_convex figure)
{
    assert(it->ground_count < GROUNDS);
    it->ground_area += kent_convex_area(&figure);
    it->ground[it->ground_count++] = figure;
}

static void item_block(item *it, const kent_footprint *at)
{
    const double ux = at->along.x, uy = at->along.y, half = at->half_width;
    const kent_taper body = {it->x,     it->y, ux,  uy, -at->behind - TOUCH,
                             at->front, half,  half};

    it->body = kent_convex_taper(&body);
    it->radius = hypot(half, fmax(at->front, at->behind));
    if (!at->leans) return;
    const double reach = kent_wedge_reach(&at->wedge);
    const double far = at->wedge.front + reach;
    const double wide = kent_wedge_half_width(&at->wedge, reach);
    const double ways[GROUNDS][2] = {{ux, uy}, {-ux, -uy}, {-uy, ux}, {uy, -ux}};
    const int sides = at->all_round ? 4 : at->both_ways ? 2 : 1;
    for (int side = 0; side < sides; side++) {
        const kent_taper ground = {
            it->x,           it->y, ways[side][0],        ways[side][1],
            at->wedge.front, far,   at->wedge.half_width, wide};
        item_ground(it, kent_convex_taper(&ground));
    }
    it->radius = fmax(it->radius, hypot(far, wide));
}

/* The ground beside each leg of a bend, on the side that it is pushed to. */
static void item_joints(item *it, const kent_model *m, const kent_holding *h)
{
    const kent_footprint *at = &h->footprint;
    const kent_fitting *f = &m->fittings[it->fitting];

    for (size_t i = 0; i < h->leg_count && it->ground_count < GROUNDS; i++) {
        const kent_port *p = &m->ports[f->port_first + h->legs[i].port];
        const double level = hypot(p->direction.x, p->direction.y);
        const double length = fmin(BESIDE, h->legs[i].length);
        if (!(level > 0.0) || !(length > 0.0)) continue;
        const double ux = p->direction.x / level, uy = p->direction.y / level;
        const double side = ux * at->along.y - uy * at->along.x > 0.0 ? 1.0 : -1.0;
        const double out = at->side_from + 0.5 * at->side_reach;
        const kent_taper ground = {
            it->x - side * uy * out, it->y + side * ux * out, ux, uy, 0.0, length,
            0.5 * at->side_reach,    0.5 * at->side_reach};
        item_ground(it, kent_convex_taper(&ground));
        it->radius = fmax(it->radius, hypot(length, at->side_from + at->side_reach));
    }
}

static item item_of(const kent_model *m, const kent_restraints *r, size_t fitting)
{
    const kent_holding *h = &r->fittings[fitting];
    const kent_fitting *f = &m->fittings[fitting];
    item it = {.fitting = fitting, .x = f->at.x, .y = f->at.y};

    if (h->footprint.half_width > 0.0) item_block(&it, &h->footprint);
    if (h->footprint.pipe_leans) item_joints(&it, m, h);
    return it;
}

/* ---- the grid -------------------------------------------------------------------- */

static int by_cell(const void *left, const void *right)
{
    const item *a = left, *b = right;

    if (a->column != b->column) return a->column < b->column ? -1 : 1;
    if (a->row != b->row) return a->row < b->row ? -1 : 1;
    return (a->fitting > b->fitting) - (a->fitting < b->fitting);
}

/* The first item of a cell, or of those after it. */
static size_t cell_first(const finder *f, long long column, long long row)
{
    size_t from = 0, to = f->count;

    while (from < to) {
        const size_t middle = from + (to - from) / 2;
        const item *it = &f->items[middle];
        const bool before =
            it->column < column || (it->column == column && it->row < row);
        if (before) {
            from = middle + 1;
        } else {
            to = middle;
        }
    }
    return from;
}

static kent_status finder_start(finder *f, kent_error *err)
{
    const kent_restraints *r = f->r;
    double widest = 0.0;

    f->items = kent_alloc(r->fitting_count, sizeof *f->items);
    if (!f->items) return kent_error_nomem(err);
    for (size_t i = 0; i < r->fitting_count; i++) {
        if (!r->fittings[i].footprint.placed) continue;
        const item it = item_of(f->m, r, i);
        if (!(it.radius > 0.0)) continue; /* legs that are upright */
        f->items[f->count++] = it;
        f->cell = fmax(f->cell, 2.0 * it.radius);
    }
    for (size_t i = 0; i < f->m->pipe_count; i++) {
        widest = fmax(widest, f->m->pipes[i].outside_diameter);
    }
    f->cell += 2.0 * widest;
    for (size_t i = 0; i < f->count; i++) {
        f->items[i].column = (long long)floor(f->items[i].x / f->cell);
        f->items[i].row = (long long)floor(f->items[i].y / f->cell);
    }
    if (f->count > 0) qsort(f->items, f->count, sizeof *f->items, by_cell);
    return KENT_OK;
}

/* ---- meetings -------------------------------------------------------------------- */

static void note(finder *f, kent_neighbour met)
{
    kent_space *s = &f->r->space;

    if (kent_grow((void **)&s->met, &f->capacity, s->count + 1, sizeof *s->met) != 0) {
        f->failed = true;
        return;
    }
    s->met[s->count++] = met;
}

/* Of the ground that a leans on: what a figure takes. */
static double share_taken(const item *a, const kent_convex *figure)
{
    double area = 0.0;

    for (size_t i = 0; i < a->ground_count && figure->count > 0; i++) {
        area += kent_convex_shared(&a->ground[i], figure);
    }
    return a->ground_area > 0.0 ? area / a->ground_area : 0.0;
}

static void meet(finder *f, const item *a, const item *b)
{
    const bool bodies = a->body.count > 0 && b->body.count > 0;
    kent_neighbour met = {
        .fitting = a->fitting, .other = (int)b->fitting, .pipe = -1, .clear = NAN};

    if (bodies) met.clear = kent_convex_gap(&a->body, &b->body);
    if (bodies && kent_convex_shared(&a->body, &b->body) > TOUCH) {
        met.how = KENT_MEETS_BODY;
        note(f, met);
        return;
    }
    met.share = share_taken(a, &b->body);
    if (met.share > TOUCH) {
        met.how = KENT_MEETS_OPENED;
        note(f, met);
        return;
    }
    met.share = 0.0;
    for (size_t i = 0; i < b->ground_count; i++) {
        met.share += share_taken(a, &b->ground[i]);
    }
    if (!(met.share > TOUCH)) return;
    met.share = fmin(1.0, met.share);
    met.how = KENT_MEETS_SHARED;
    note(f, met);
}

static void meet_fittings(finder *f)
{
    for (size_t i = 0; i < f->count; i++) {
        const item *a = &f->items[i];
        for (long long column = a->column - 1; column <= a->column + 1; column++) {
            for (size_t k = cell_first(f, column, a->row - 1); k < f->count; k++) {
                const item *b = &f->items[k];
                if (b->column > column || b->row > a->row + 1) break;
                const double apart = hypot(a->x - b->x, a->y - b->y);
                if (k != i && apart < a->radius + b->radius) meet(f, a, b);
            }
        }
    }
}

/* ---- mains ----------------------------------------------------------------------- */

typedef struct stretch { /* of a pipe, straight between two points of its route */
    int pipe, from, to;
    size_t number;
    double x, y, ux, uy, length; /* m */
} stretch;

static bool fitting_touches(const kent_model *m, const kent_fitting *f,
                            const stretch *s)
{
    if (f->point == s->from || f->point == s->to) return true;
    for (size_t i = 0; i < f->member_count; i++) {
        const int member = m->members[f->member_first + i];
        if (member == s->from || member == s->to) return true;
    }
    return false;
}

/* A leg's own pipe goes on along the ground beside it. */
static bool is_own_leg(const kent_model *m, const kent_fitting *f, const stretch *s)
{
    for (size_t k = 0; k < f->port_count; k++) {
        const kent_port *p = &m->ports[f->port_first + k];
        if (p->span >= 0 && m->spans[p->span].pipe == s->pipe) return true;
    }
    return false;
}

static void meet_main(finder *f, item *it, const stretch *s)
{
    const kent_fitting *fitting = &f->m->fittings[it->fitting];
    const kent_footprint *at = &f->r->fittings[it->fitting].footprint;
    const bool along = !at->leans || at->both_ways; /* it leans beside its own pipe */
    const double half = 0.5 * f->m->pipes[s->pipe].outside_diameter;
    const kent_taper line = {s->x, s->y, s->ux, s->uy, 0.0, s->length, half, half};
    const kent_convex main = kent_convex_taper(&line);

    if (it->stretch == s->number + 1 || fitting_touches(f->m, fitting, s)) return;
    it->stretch = s->number + 1;
    if (along && is_own_leg(f->m, fitting, s)) return;
    const double share = share_taken(it, &main);
    if (!(share > TOUCH)) return;
    const double foot = (it->x - s->x) * s->ux + (it->y - s->y) * s->uy;
    const double near = fmin(s->length, fmax(0.0, foot));
    note(f,
         (kent_neighbour){
             .fitting = it->fitting,
             .other = -1,
             .pipe = s->pipe,
             .how = KENT_MEETS_MAIN,
             .clear = hypot(it->x - s->x - near * s->ux, it->y - s->y - near * s->uy),
             .share = share,
         });
}

static void meet_at(finder *f, const stretch *s, double along)
{
    const long long row = (long long)floor((s->y + along * s->uy) / f->cell);
    const long long middle = (long long)floor((s->x + along * s->ux) / f->cell);

    for (long long column = middle - 1; column <= middle + 1; column++) {
        for (size_t k = cell_first(f, column, row - 1); k < f->count; k++) {
            item *it = &f->items[k];
            if (it->column > column || it->row > row + 1) break;
            meet_main(f, it, s);
        }
    }
}

/* Walks every stretch by half a cell: whatever it passes lies in a cell beside. */
static void meet_mains(finder *f)
{
    const kent_model *m = f->m;
    size_t number = 0;

    for (size_t p = 0; p < m->pipe_count && f->count > 0; p++) {
        const kent_pipe *pipe = &m->pipes[p];
        if (pipe->above_ground) continue;
        for (size_t k = 1; k < pipe->route_count; k++, number++) {
            const int from = m->route[pipe->route_first + k - 1];
            const int to = m->route[pipe->route_first + k];
            const kent_vec3 a = m->points[from].at, b = m->points[to].at;
            const double length = hypot(b.x - a.x, b.y - a.y);
            if (!(length > 0.0)) continue; /* NaN: no coordinates */
            const stretch s = {(int)p,
                               from,
                               to,
                               number,
                               a.x,
                               a.y,
                               (b.x - a.x) / length,
                               (b.y - a.y) / length,
                               length};
            const size_t steps = (size_t)ceil(length / (0.5 * f->cell));
            for (size_t i = 0; i < steps; i++) {
                meet_at(f, &s, (double)i * 0.5 * f->cell);
            }
            meet_at(f, &s, length);
        }
    }
}

/* ---- what is said ---------------------------------------------------------------- */

static int by_fitting(const void *left, const void *right)
{
    const kent_neighbour *a = left, *b = right;

    if (a->fitting != b->fitting) return a->fitting < b->fitting ? -1 : 1;
    if (a->how != b->how) return a->how < b->how ? -1 : 1;
    if (a->other != b->other) return a->other < b->other ? -1 : 1;
    if (a->pipe != b->pipe) return a->pipe < b->pipe ? -1 : 1;
    return (a->clear > b->clear) - (a->clear < b->clear);
}

/* A main of several stretches is one neighbour, at its nearest. */
static void one_of_each_main(kent_space *s)
{
    size_t kept = 0;

    for (size_t i = 0; i < s->count; i++) {
        const kent_neighbour *last = kept > 0 ? &s->met[kept - 1] : NULL;
        const bool same = last && last->fitting == s->met[i].fitting &&
                          last->how == s->met[i].how && last->how == KENT_MEETS_MAIN &&
                          last->pipe == s->met[i].pipe;
        if (same) {
            s->met[kept - 1].share = fmin(1.0, last->share + s->met[i].share);
        } else {
            s->met[kept++] = s->met[i];
        }
    }
    s->count = kept;
}

static void say(const kent_model *m, const kent_neighbour *n, kent_holding *h)
{
    const char *other = n->other >= 0 ? m->fittings[n->other].id : m->pipes[n->pipe].id;
    const kent_said clear = kent_said_of(KENT_LENGTH, m->units, n->clear);
    const double percent = 100.0 * n->share;
    const bool block = h->footprint.half_width > 0.0;

    switch (n->how) {
    case KENT_MEETS_BODY:
        kent_notes_warn(&h->cautions,
                        "its block and that of '%s' take up the same place: make them "
                        "one block (together_with), or move one",
                        other);
        break;
    case KENT_MEETS_OPENED:
        kent_notes_warn(&h->cautions,
                        "the block of '%s' stands in the ground that this leans on "
                        "(%.0f %% of it): that ground is dug open; make them one "
                        "(together_with), or hold one of them by restrained joints",
                        other, percent);
        break;
    case KENT_MEETS_SHARED:
        kent_notes_warn(
            &h->cautions,
            "this and '%s' lean on the same ground, %.0f %% of this one's at "
            "the surface%s%s%s: it does not bear both at full value; hold them as one "
            "(together_with), or one of them by other means",
            other, percent, isnan(n->clear) ? "" : ", their blocks ",
            isnan(n->clear) ? "" : clear.s, isnan(n->clear) ? "" : " apart");
        break;
    case KENT_MEETS_MAIN:
        kent_notes_warn(
            &h->cautions,
            "'%s' runs through the ground that %s leans on, %s from the "
            "fitting (%.0f %% of that ground): in its trench nothing may be "
            "leant on, so move one, or restrain longer",
            other, block ? "the block" : "the restrained pipe", clear.s, percent);
        break;
    }
}

static void say_all(const finder *f)
{
    const kent_space *s = &f->r->space;
    size_t told = 0;

    for (size_t i = 0; i < s->count; i++) {
        kent_holding *h = &f->r->fittings[s->met[i].fitting];
        told = i > 0 && s->met[i - 1].fitting == s->met[i].fitting ? told + 1 : 0;
        if (told < TOLD) {
            say(f->m, &s->met[i], h);
        } else if (told == TOLD) {
            kent_notes_warn(&h->cautions,
                            "more blocks or mains stand in that ground than are named");
        }
    }
}

kent_status kent_space_find(const kent_model *m, kent_restraints *r, kent_error *err)
{
    finder f = {.m = m, .r = r};
    kent_space *s = &r->space;
    kent_status status = finder_start(&f, err);

    if (status != KENT_OK) return status;
    meet_fittings(&f);
    meet_mains(&f);
    if (s->count > 0) qsort(s->met, s->count, sizeof *s->met, by_fitting);
    one_of_each_main(s);
    say_all(&f);
    for (size_t i = 0; i < s->count; i++) {
        f.failed = f.failed || r->fittings[s->met[i].fitting].cautions.failed;
    }
    free(f.items);
    return f.failed ? kent_error_nomem(err) : KENT_OK;
}

const kent_neighbour *kent_space_of(const kent_space *space, size_t fitting,
                                    size_t *count)
{
    size_t from = 0, to = space->count, end;

    while (from < to) {
        const size_t middle = from + (to - from) / 2;
        if (space->met[middle].fitting < fitting) {
            from = middle + 1;
        } else {
            to = middle;
        }
    }
    for (end = from; end < space->count && space->met[end].fitting == fitting; end++) {
    }
    *count = end - from;
    return *count > 0 ? &space->met[from] : NULL;
}

void kent_space_clear(kent_space *space)
{
    free(space->met);
    *space = (kent_space){NULL, 0};
}
