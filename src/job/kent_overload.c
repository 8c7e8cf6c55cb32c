#include "kent_overload.h"

#include "kent_limit_table.h"
#include "kent_reach.h"
#include "kent_said.h"

#include <math.h>
#include <string.h>

enum { NAMED = 6 }; /* places told of one case; the rest are counted */

/* ---- saying it ------------------------------------------------------------------- */

/* "rated 10.00 bar with surge (EN 545:2010)". */
static void add_rating(const kent_model *m, const kent_pipe *p, kent_rating rating,
                       kent_text *out)
{
    static const char *const UNDER[KENT_RATINGS] = {
        "", " with surge", " with surge that recurs", " under test"};
    if (rating == KENT_RATING_RECURRING && isnan(p->recurring_rating)) {
        rating = KENT_RATING_SURGE;
    }
    const bool borrowed = rating == KENT_RATING_SURGE && isnan(p->surge_rating);
    kent_text_add(out, "rated %s%s",
                  kent_said_of(KENT_PRESSURE, m->units, kent_pipe_rating(p, rating)).s,
                  UNDER[borrowed ? KENT_RATING_SERVICE : rating]);
    if (p->derating < 1.0) {
        kent_text_add(out, ", with the share of %.2f that its temperature leaves",
                      p->derating);
    }
    if (p->standard[0] != '\0') kent_text_add(out, " (%s)", p->standard);
}

static void add_pressure(const kent_model *m, double pressure, kent_text *out)
{
    kent_text_add(out, "%s", kent_said_of(KENT_PRESSURE, m->units, pressure).s);
}

static void add_place(const kent_model *m, const kent_limit *l, kent_text *out)
{
    if (l->note >= 0) return; /* it is its place */
    if (l->point >= 0) {
        kent_text_add(out, " at %s", m->points[l->point].id);
    } else {
        const double start = m->chainage[m->spans[l->span].route_first];
        kent_text_add(out, " %s along it",
                      kent_said_whole(KENT_LENGTH, m->units, l->chainage - start).s);
    }
}

static void add_subject(const kent_model *m, const kent_limit *l, kent_text *out)
{
    if (l->note >= 0) {
        kent_text_add(out, "fitting %s", m->notes[l->note].id);
    } else if (l->kind == KENT_LIMIT_JOINT) {
        kent_text_add(out, "joints of pipe %s", m->pipes[l->pipe].id);
    } else {
        kent_text_add(out, "pipe %s", m->spans[l->span].id);
    }
}

static void add_asked(const kent_model *m, const kent_limit *l, kent_text *out)
{
    switch (l->kind) {
    case KENT_LIMIT_PIPE:
        add_rating(m, &m->pipes[l->pipe], l->rating, out);
        return;
    case KENT_LIMIT_JOINT:
    case KENT_LIMIT_FITTING:
        kent_text_add(out, "rated ");
        break;
    case KENT_LIMIT_LOWEST:
        kent_text_add(out, "asked at least ");
        break;
    case KENT_LIMIT_COLLAPSE:
        kent_text_add(out, "from outside, an unsupported ring of its wall buckles at ");
        break;
    case KENT_LIMIT_VAPOUR:
    case KENT_LIMIT_KINDS:
        break;
    }
    add_pressure(m, l->asked, out);
    if (l->note < 0 || m->notes[l->note].standard[0] == '\0') return;
    kent_text_add(out, " (%s)", m->notes[l->note].standard);
}

static void say_passed(kent_results *r, const kent_limit *l)
{
    const kent_model *m = r->model;
    kent_text words = {0};
    add_subject(m, l, &words);
    kent_text_add(&words, ": ");
    add_pressure(m, l->reached, &words);
    kent_text_add(&words, " reached");
    add_place(m, l, &words);
    kent_text_add(&words, " in %s, ", l->when.s);
    add_asked(m, l, &words);
    kent_notes_warn(&r->cautions, "%s", kent_text_of(&words));
    r->cautions.failed = r->cautions.failed || words.failed;
    kent_text_clear(&words);
}

/* "3 more pipes pass their ratings in static". */
static void say_rest(kent_results *r, const kent_limit *l, size_t passed)
{
    static const char *const WHAT[KENT_LIMIT_KINDS] = {
        [KENT_LIMIT_PIPE] = "pipes pass their ratings",
        [KENT_LIMIT_JOINT] = "pipes pass the ratings of their joints",
        [KENT_LIMIT_FITTING] = "fittings pass their ratings",
        [KENT_LIMIT_LOWEST] = "pipes fall below the lowest pressure asked",
        [KENT_LIMIT_COLLAPSE] = "pipes are pressed beyond an unsupported ring",
    };
    if (passed <= NAMED) return;
    kent_notes_warn(&r->cautions, "%zu more %s in %s", passed - NAMED, WHAT[l->kind],
                    l->when.s);
}

/* ---- the cases ------------------------------------------------------------------- */

static bool of_one_case(const kent_limit *a, const kent_limit *b)
{
    return a->kind == b->kind && a->state == b->state && a->march == b->march &&
           a->rating == b->rating && strcmp(a->when.s, b->when.s) == 0;
}

/* Every limit passed, of the test alone or of all else; what is near the vapour limit
 * is said by whoever knows of cavities. */
static void say_all(kent_results *r, bool test)
{
    size_t passed = 0;
    for (size_t i = 0; i < r->limit_count; i++) {
        const kent_limit *l = &r->limits[i];
        const bool last = i + 1 == r->limit_count || !of_one_case(l, &r->limits[i + 1]);
        const bool said = l->exceeded && !l->for_comparison &&
                          l->kind != KENT_LIMIT_VAPOUR &&
                          (l->rating == KENT_RATING_TEST) == test;
        if (said && passed++ < NAMED) say_passed(r, l);
        if (!last) continue;
        say_rest(r, l, passed);
        passed = 0;
    }
}

/* What is held against nothing must not look as if it had passed. */
static void say_unrated(kent_results *r, kent_rating rating, const char *what,
                        const char *held)
{
    const kent_model *m = r->model;
    kent_text pipes = {0};
    size_t count = 0;
    for (size_t i = 0; i < m->pipe_count; i++) {
        if (!isnan(kent_pipe_rating(&m->pipes[i], rating))) continue;
        if (count < NAMED) kent_text_add(&pipes, count ? ", %s" : "%s", m->pipes[i].id);
        count++;
    }
    if (count > NAMED) kent_text_add(&pipes, " and %zu more", count - NAMED);
    if (count > 0) {
        kent_notes_add(&r->cautions,
                       "no %s rating is known of pipe%s %s: %s is held "
                       "against none",
                       what, count > 1 ? "s" : "", kent_text_of(&pipes), held);
    }
    r->cautions.failed = r->cautions.failed || pipes.failed;
    kent_text_clear(&pipes);
}

void kent_overload_judge(kent_results *r)
{
    say_all(r, false);
    say_unrated(r, KENT_RATING_SERVICE, "pressure", "what the main reaches there");
    if (isnan(r->loads->test.pressure)) return;
    say_all(r, true);
    say_unrated(r, KENT_RATING_TEST, "test", "the test pressure there");
}

/* ---- the whole main -------------------------------------------------------------- */

static int nearest_point(const kent_model *m, const kent_span *span, double x)
{
    const size_t first = span->route_first;
    double least = INFINITY;
    int nearest = m->route[first];
    for (size_t k = first; k < first + span->route_count; k++) {
        const double gap = fabs(m->chainage[k] - m->chainage[first] - x);
        if (gap >= least) continue;
        least = gap;
        nearest = m->route[k];
    }
    return nearest;
}

kent_worst kent_overload_of_marches(const kent_results *r)
{
    const kent_model *m = r->model;
    kent_worst worst = {.pressure = NAN, .level = NAN, .point = -1, .when = ""};
    for (size_t i = 0; i < r->scenario_count; i++) {
        const kent_scenario_result *run = &r->scenarios[i];
        if (m->scenarios[run->scenario].for_comparison) continue;
        for (size_t s = 0; s < m->span_count; s++) {
            const kent_span *span = &m->spans[s];
            const kent_reached at =
                kent_reach_of_march(m, run, (int)s, KENT_SEARCH_HIGHEST);
            if (!isfinite(at.pressure) || at.pressure <= worst.pressure) continue;
            const double x = at.chainage - m->chainage[span->route_first];
            worst =
                (kent_worst){at.pressure, kent_span_level(m, span, x),
                             nearest_point(m, span, x), m->scenarios[run->scenario].id};
        }
    }
    return worst;
}
