#include "kent_string.h"

#include <math.h>
#include <stdlib.h>

/* A stretch of one span between two of its stops, in a string all along. */
typedef struct string_piece {
    int span;
    size_t stop[2]; /* into kent_model.route */
} string_piece;

/* What leaves a point: a piece's end, or that of a span that is in no string. */
typedef struct string_arm {
    int point, piece, span; /* piece -1: none */
    size_t stop;
    int side; /* 0: leaves the point along the span, 1: against it */
} string_arm;

typedef struct string_work {
    const kent_model *m;
    int *fitting_at; /* [point_count] -1: none */
    string_piece *pieces;
    size_t piece_count;
    int *root; /* [piece_count] the first of its string */
    string_arm *arms;
    size_t arm_count;
} string_work;

static bool joint_goes_on(kent_joint joint)
{
    return !kent_joint_slips(joint) && joint != KENT_RESTRAINED;
}

static kent_role role_at(const string_work *w, int point)
{
    const int f = w->fitting_at[point];
    return f >= 0 ? w->m->fittings[f].role : KENT_ROLE_NONE;
}

/* Whether a string ends at a point, whatever meets there. */
static bool point_parts(const string_work *w, int point)
{
    const kent_role role = role_at(w, point);
    return role == KENT_ROLE_FLANGE_ADAPTOR || role == KENT_ROLE_WALL;
}

/* ---- pieces and arms ------------------------------------------------------------- */

static void add_arms(string_work *w, int piece, int span, size_t first, size_t last)
{
    const size_t stop[2] = {first, last};

    for (int side = 0; side < 2; side++) {
        w->arms[w->arm_count++] =
            (string_arm){w->m->route[stop[side]], piece, span, stop[side], side};
    }
}

static void cut_span(string_work *w, size_t span)
{
    const kent_span *s = &w->m->spans[span];
    const size_t last = s->route_first + s->route_count - 1;
    size_t first = s->route_first;

    if (!joint_goes_on(w->m->pipes[s->pipe].joint)) {
        add_arms(w, -1, (int)span, first, last);
        return;
    }
    for (size_t k = first + 1; k <= last; k++) {
        if (k < last && !point_parts(w, w->m->route[k])) continue;
        const int piece = (int)w->piece_count++;
        w->pieces[piece] = (string_piece){(int)span, {first, k}};
        w->root[piece] = piece;
        add_arms(w, piece, (int)span, first, k);
        first = k;
    }
}

static int arm_compare(const void *left, const void *right)
{
    const string_arm *a = left, *b = right;

    if (a->point != b->point) return a->point < b->point ? -1 : 1;
    if (a->span != b->span) return a->span < b->span ? -1 : 1;
    if (a->stop != b->stop) return a->stop < b->stop ? -1 : 1;
    return a->side - b->side;
}

/* ---- strings --------------------------------------------------------------------- */

static int root_of(int *root, int piece)
{
    while (root[piece] != piece) {
        root[piece] = root[root[piece]];
        piece = root[piece];
    }
    return piece;
}

static void unite(int *root, int a, int b)
{
    const int x = root_of(root, a), y = root_of(root, b);
    root[x < y ? y : x] = x < y ? x : y;
}

/* The arms of one point, from `first` on. */
static size_t arms_at(const string_work *w, size_t first)
{
    size_t end = first + 1;
    while (end < w->arm_count && w->arms[end].point == w->arms[first].point) {
        end++;
    }
    return end;
}

static size_t arms_in_strings(const string_work *w, size_t first, size_t end)
{
    size_t count = 0;
    for (size_t i = first; i < end; i++) {
        count += w->arms[i].piece >= 0;
    }
    return count;
}

/* A pump in line stands on a base of its own: a string does not go on through it. */
static bool pump_stands(const kent_model *m, int point)
{
    for (size_t i = 0; i < m->pump_count; i++) {
        if (m->pumps[i].point == point) return true;
    }
    return false;
}

static bool goes_on_at(const string_work *w, size_t first, size_t end)
{
    const int point = w->arms[first].point;
    return arms_in_strings(w, first, end) >= 2 && !point_parts(w, point) &&
           !pump_stands(w->m, point);
}

static void join_strings(string_work *w)
{
    for (size_t first = 0, end; first < w->arm_count; first = end) {
        int other = -1;
        end = arms_at(w, first);
        if (!goes_on_at(w, first, end)) continue;
        for (size_t i = first; i < end; i++) {
            if (w->arms[i].piece < 0) continue;
            if (other >= 0) unite(w->root, other, w->arms[i].piece);
            other = w->arms[i].piece;
        }
    }
}

/* ---- ends ------------------------------------------------------------------------ */

/* What the case has at a point where a single leg ends. */
static kent_string_end_kind kind_alone(const string_work *w, int point)
{
    const kent_model *m = w->m;

    for (size_t i = 0; i < m->fixed_level_count; i++) {
        if (m->fixed_levels[i].point == point) return KENT_STRING_TO_WALL;
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        if (m->valves[i].point == point) return KENT_STRING_TO_DEVICE;
    }
    if (pump_stands(m, point)) return KENT_STRING_TO_DEVICE;
    const int f = w->fitting_at[point];
    if (f >= 0 && m->fittings[f].type == KENT_DEAD_END) return KENT_STRING_CLOSED;
    return KENT_STRING_TO_OPEN;
}

static kent_string_end end_of(const string_work *w, const string_arm *arm, size_t first,
                              size_t end)
{
    const kent_model *m = w->m;
    const kent_role role = role_at(w, arm->point);
    const string_arm *slips = NULL;
    kent_string_end e = {
        .string = root_of(w->root, arm->piece),
        .point = arm->point,
        .fitting = w->fitting_at[arm->point],
        .span = arm->span,
        .chainage =
            m->chainage[arm->stop] - m->chainage[m->spans[arm->span].route_first],
        .sign = arm->side == 0 ? 1.0 : -1.0,
        .beyond = -1,
        .beyond_chainage = (double)NAN,
    };

    for (size_t i = first; i < end; i++) {
        const string_arm *other = &w->arms[i];
        if (other == arm || (other->piece >= 0 && !point_parts(w, arm->point))) {
            continue;
        }
        if (slips && m->spans[slips->span].bore >= m->spans[other->span].bore) continue;
        slips = other;
    }
    if (slips) {
        const kent_span *span = &m->spans[slips->span];
        e.beyond = slips->span;
        e.beyond_chainage = m->chainage[slips->stop] - m->chainage[span->route_first];
        e.beyond_sign = slips->side == 0 ? 1.0 : -1.0;
    }
    if (role == KENT_ROLE_WALL) {
        e.kind = KENT_STRING_TO_WALL;
    } else if (pump_stands(m, arm->point)) {
        e.kind = KENT_STRING_TO_DEVICE;
    } else if (slips) {
        const kent_joint joint = m->pipes[m->spans[slips->span].pipe].joint;
        e.kind = joint == KENT_RESTRAINED && role != KENT_ROLE_FLANGE_ADAPTOR
                     ? KENT_STRING_TO_RESTRAINED
                     : KENT_STRING_TO_JOINTS;
    } else {
        e.kind = kind_alone(w, arm->point);
    }
    return e;
}

/* Whether any of a string's pipes is fused or welded, by its root. */
static void mark_listed(string_work *w, bool *listed, double *length)
{
    for (size_t i = 0; i < w->piece_count; i++) {
        const string_piece *p = &w->pieces[i];
        const kent_joint joint = w->m->pipes[w->m->spans[p->span].pipe].joint;
        const int root = root_of(w->root, (int)i);
        listed[root] |= joint == KENT_FUSED || joint == KENT_WELDED;
        length[root] += w->m->chainage[p->stop[1]] - w->m->chainage[p->stop[0]];
    }
}

static int end_compare(const void *left, const void *right)
{
    const kent_string_end *a = left, *b = right;

    if (a->string != b->string) return a->string < b->string ? -1 : 1;
    if (a->span != b->span) return a->span < b->span ? -1 : 1;
    return (a->chainage > b->chainage) - (a->chainage < b->chainage);
}

/* Strings are numbered by their first piece; number: room for that. */
static void list_strings(string_work *w, const bool *listed, int *number,
                         const double *length, kent_strings *out)
{
    for (size_t i = 0; i < w->piece_count; i++) {
        if (!listed[i]) continue;
        number[i] = (int)out->string_count;
        out->length[out->string_count++] = length[i];
    }
    for (size_t i = 0; i < w->piece_count; i++) {
        const string_piece *p = &w->pieces[i];
        const int root = root_of(w->root, (int)i);
        if (!listed[root]) continue;
        out->parts[out->part_count++] = (kent_string_part){
            .string = number[root],
            .pipe = w->m->spans[p->span].pipe,
            .length = w->m->chainage[p->stop[1]] - w->m->chainage[p->stop[0]],
        };
    }
    for (size_t first = 0, end; first < w->arm_count; first = end) {
        end = arms_at(w, first);
        if (goes_on_at(w, first, end)) continue;
        for (size_t i = first; i < end; i++) {
            const int piece = w->arms[i].piece;
            if (piece < 0 || !listed[root_of(w->root, piece)]) continue;
            kent_string_end e = end_of(w, &w->arms[i], first, end);
            e.string = number[e.string];
            out->ends[out->end_count++] = e;
        }
    }
    if (out->end_count > 0) {
        qsort(out->ends, out->end_count, sizeof *out->ends, end_compare);
    }
}

static void find_fittings(string_work *w)
{
    const kent_model *m = w->m;

    for (size_t i = 0; i < m->point_count; i++) {
        w->fitting_at[i] = -1;
    }
    for (size_t i = 0; i < m->fitting_count; i++) {
        const kent_fitting *f = &m->fittings[i];
        if (f->point >= 0) w->fitting_at[f->point] = (int)i;
        for (size_t k = f->member_first; k < f->member_first + f->member_count; k++) {
            w->fitting_at[m->members[k]] = (int)i;
        }
    }
}

kent_status kent_strings_find(const kent_model *m, kent_strings *out, kent_error *err)
{
    const size_t most = m->route_count; /* pieces; twice as many arms */
    kent_status status = KENT_E_NOMEM;
    kent_strings found = {0};
    string_work w = {
        .m = m,
        .fitting_at = kent_alloc(m->point_count, sizeof *w.fitting_at),
        .pieces = kent_alloc(most, sizeof *w.pieces),
        .root = kent_alloc(most, sizeof *w.root),
        .arms = kent_alloc(2, most * sizeof *w.arms),
    };
    bool *listed = kent_alloc(most, sizeof *listed);
    int *number = kent_alloc(most, sizeof *number);
    double *length = kent_alloc(most, sizeof *length);

    found.length = kent_alloc(most, sizeof *found.length);
    found.parts = kent_alloc(most, sizeof *found.parts);
    found.ends = kent_alloc(2, most * sizeof *found.ends);
    if (!w.fitting_at || !w.pieces || !w.root || !w.arms || !listed || !number ||
        !length || !found.length || !found.parts || !found.ends) {
        (void)kent_error_nomem(err);
        goto done;
    }
    find_fittings(&w);
    for (size_t i = 0; i < m->span_count; i++) {
        cut_span(&w, i);
    }
    if (w.arm_count > 0) qsort(w.arms, w.arm_count, sizeof *w.arms, arm_compare);
    join_strings(&w);
    mark_listed(&w, listed, length);
    list_strings(&w, listed, number, length, &found);
    *out = found;
    found = (kent_strings){0}; /* handed over */
    status = KENT_OK;
done:
    free(w.fitting_at);
    free(w.pieces);
    free(w.root);
    free(w.arms);
    free(listed);
    free(number);
    free(length);
    kent_strings_clear(&found);
    return status;
}

void kent_strings_clear(kent_strings *s)
{
    for (size_t i = 0; i < s->end_count; i++) {
        free(s->ends[i].cases);
    }
    free(s->ends);
    free(s->length);
    free(s->parts);
    *s = (kent_strings){0};
}
