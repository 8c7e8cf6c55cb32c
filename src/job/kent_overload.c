#include "kent_overload.h"

#include "kent_said.h"

#include <math.h>

enum { NAMED = 6 }; /* places told of one case; the rest are counted */

/* The highest pressure on a span in one case. */
typedef struct reached {
    double pressure; /* Pa gauge; -INFINITY: none yet */
    double chainage; /* m from the span's start */
    int point;       /* -1: between points */
} reached;

/* One case as it is judged. */
typedef struct judgement {
    kent_results *results;
    const char *when;
    kent_rating rating;
    size_t passed; /* spans so far */
} judgement;

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

static void say_passed(const judgement *j, int span, const reached *at)
{
    const kent_model *m = j->results->model;
    kent_text words = {0};
    kent_text_add(&words, "pipe %s: %s reached ", m->spans[span].id,
                  kent_said_of(KENT_PRESSURE, m->units, at->pressure).s);
    if (at->point >= 0) {
        kent_text_add(&words, "at %s", m->points[at->point].id);
    } else {
        kent_text_add(&words, "%s along it",
                      kent_said_whole(KENT_LENGTH, m->units, at->chainage).s);
    }
    kent_text_add(&words, " in %s, ", j->when);
    add_rating(m, &m->pipes[m->spans[span].pipe], j->rating, &words);
    kent_notes_add(&j->results->cautions, "%s", kent_text_of(&words));
    j->results->cautions.failed = j->results->cautions.failed || words.failed;
    kent_text_clear(&words);
}

static void judge(judgement *j, int span, const reached *at)
{
    const kent_model *m = j->results->model;
    const kent_pipe *p = &m->pipes[m->spans[span].pipe];
    if (!(at->pressure > kent_pipe_rating(p, j->rating))) return; /* NaN: not known */
    j->results->limit_exceeded = true;
    if (j->passed++ < NAMED) say_passed(j, span, at);
}

static void say_rest(const judgement *j)
{
    if (j->passed <= NAMED) return;
    kent_notes_add(&j->results->cautions, "%zu more pipes pass their ratings in %s",
                   j->passed - NAMED, j->when);
}

/* ---- looking along a span -------------------------------------------------------- */

static void take(reached *most, double pressure, double chainage, int point)
{
    if (pressure > most->pressure) *most = (reached){pressure, chainage, point};
}

/* head: m at the span's two ends; between points both head and level are straight
 * lines, so that the highest pressure is at a point. */
static reached highest_of_line(const kent_model *m, const kent_span *span,
                               const double head[2])
{
    reached most = {-INFINITY, 0.0, -1};
    for (size_t k = 0; k < span->route_count; k++) {
        const size_t at = span->route_first + k;
        const double x = m->chainage[at] - m->chainage[span->route_first];
        const double h = head[0] + x / span->length * (head[1] - head[0]);
        const int point = m->route[at];
        take(&most, kent_model_pressure(m, h, m->points[point].at.z), x, point);
    }
    return most;
}

static reached highest_of_march(const kent_model *m, const kent_scenario_result *run,
                                size_t index)
{
    const kent_span *span = &m->spans[index];
    const int reaches = run->grid->reaches[index];
    reached most = {-INFINITY, 0.0, -1};
    for (int n = 0; n <= reaches; n++) {
        const double x = span->length * (double)n / (double)reaches;
        const int point = n == 0         ? m->nodes[span->node[0]].point
                          : n == reaches ? m->nodes[span->node[1]].point
                                         : -1;
        const double z = kent_span_level(m, span, x);
        take(&most, kent_model_pressure(m, run->highest[index][n], z), x, point);
    }
    return most;
}

/* ---- the cases ------------------------------------------------------------------- */

static void judge_static(kent_results *r)
{
    const kent_model *m = r->model;
    judgement j = {r, "static", KENT_RATING_SERVICE, 0};
    for (size_t i = 0; i < m->span_count; i++) {
        const double level = kent_static_level(m, m->spans[i].node[0]);
        const reached at = highest_of_line(m, &m->spans[i], (double[2]){level, level});
        judge(&j, (int)i, &at);
    }
    say_rest(&j);
}

static void judge_steady(kent_results *r, size_t state)
{
    const kent_model *m = r->model;
    const double *head = r->steadies[state]->node_head;
    const kent_name name = kent_name_in_state(m, "steady", (int)state);
    judgement j = {r, name.s, KENT_RATING_SERVICE, 0};
    for (size_t i = 0; i < m->span_count; i++) {
        const int *node = m->spans[i].node;
        const reached at =
            highest_of_line(m, &m->spans[i], (double[2]){head[node[0]], head[node[1]]});
        judge(&j, (int)i, &at);
    }
    say_rest(&j);
}

static void judge_march(kent_results *r, const kent_scenario_result *run)
{
    const kent_model *m = r->model;
    const kent_scenario *scenario = &m->scenarios[run->scenario];
    const kent_name name = kent_name_in_state(m, scenario->id, run->state);
    judgement j = {r, name.s,
                   scenario->class_of == KENT_RECURRING ? KENT_RATING_RECURRING
                                                        : KENT_RATING_SURGE,
                   0};
    for (size_t i = 0; i < m->span_count; i++) {
        const reached at = highest_of_march(m, run, i);
        judge(&j, (int)i, &at);
    }
    say_rest(&j);
}

/* Still water from the gauge; without one every place has the test pressure itself. */
static void judge_test(kent_results *r, const kent_site_test *test)
{
    const kent_model *m = r->model;
    judgement j = {r, "test", KENT_RATING_TEST, 0};
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        reached at = {test->pressure, 0.0, m->nodes[span->node[0]].point};
        if (test->gauge >= 0) {
            const double level = m->points[test->gauge].at.z +
                                 test->pressure / (m->water.density * m->gravity);
            at = highest_of_line(m, span, (double[2]){level, level});
        }
        judge(&j, (int)i, &at);
    }
    say_rest(&j);
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
    const kent_site_test *test = &r->loads->test;
    judge_static(r);
    for (size_t i = 0; i < r->steady_count && r->model->span_count > 0; i++) {
        judge_steady(r, i);
    }
    for (size_t i = 0; i < r->scenario_count; i++) {
        const int scenario = r->scenarios[i].scenario;
        if (r->model->scenarios[scenario].for_comparison) continue;
        judge_march(r, &r->scenarios[i]);
    }
    say_unrated(r, KENT_RATING_SERVICE, "pressure", "what the main reaches there");
    if (isnan(test->pressure)) return;
    judge_test(r, test);
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
            const reached at = highest_of_march(m, run, s);
            if (!isfinite(at.pressure) || at.pressure <= worst.pressure) continue;
            const kent_span *span = &m->spans[s];
            worst = (kent_worst){at.pressure, kent_span_level(m, span, at.chainage),
                                 nearest_point(m, span, at.chainage),
                                 m->scenarios[run->scenario].id};
        }
    }
    return worst;
}
