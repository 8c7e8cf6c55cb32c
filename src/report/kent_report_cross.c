/* `cross-check`: peaks of the march and of the second method side by side. */
#include "kent_sink.h"
#include "kent_view.h"

#include <math.h>
#include <stdlib.h>

/* Of a scenario's largest swing: points that move less have no share to speak of. */
static const double STILL = 0.01;

typedef struct kent_side { /* of one extreme of one point, m */
    double march, second;
    double own;   /* error of the second: N against 2N cells */
    double rigid; /* NAN: none */
    double swing; /* highest less lowest, of the march */
} kent_side;

typedef struct kent_page {
    const kent_results *results;
    const kent_opinion *opinions;
    kent_view view; /* of the main in no particular state */
} kent_page;

static kent_side side_of(const kent_page *page, size_t index, int point, bool high)
{
    const kent_peak *a = &page->results->scenarios[index].points[point];
    const kent_opinion *o = &page->opinions[index];
    const kent_second_peak *b = &o->peaks[point], *c = &o->coarse[point];
    const kent_second_peak *r = o->rigid ? &o->rigid[point] : NULL;
    const double swing = a->highest_head - a->lowest_head;
    if (high) {
        return (kent_side){a->highest_head, b->highest, fabs(b->highest - c->highest),
                           r ? r->highest : (double)NAN, swing};
    }
    return (kent_side){a->lowest_head, b->lowest, fabs(b->lowest - c->lowest),
                       r ? r->lowest : (double)NAN, swing};
}

/* m: of all points shown. */
static double largest_swing(const kent_page *page, size_t index)
{
    double most = 0.0;
    for (size_t i = 0; i < page->results->history_count; i++) {
        most = fmax(most,
                    side_of(page, index, page->results->history_points[i], true).swing);
    }
    return most;
}

/* Difference over swing; NAN where hardly anything moves. */
static double share_of(const kent_side *s, double largest)
{
    if (!(s->swing > STILL * largest)) return NAN;
    return fabs(s->march - s->second) / s->swing;
}

/* ---- the table ------------------------------------------------------------------- */

static double pressure_of(const kent_page *page, int point, double head)
{
    const kent_model *m = page->view.model;
    return kent_model_pressure(m, head, m->points[point].at.z);
}

static void add_row(const kent_page *page, kent_table *t, size_t index, int point,
                    bool high)
{
    const kent_view *v = &page->view;
    const kent_side s = side_of(page, index, point, high);
    const double share = share_of(&s, largest_swing(page, index));
    kent_view_word(t, high ? v->model->points[point].id : " ");
    kent_view_word(t, high ? "highest" : "lowest");
    kent_view_quantity(v, t, KENT_LENGTH, s.march);
    kent_view_quantity(v, t, KENT_LENGTH, s.second);
    kent_view_quantity(v, t, KENT_LENGTH, s.second - s.march);
    kent_view_quantity(v, t, KENT_LENGTH, s.own);
    kent_table_cell(t, "%s", kent_shown_number(100.0 * share, 1).text);
    kent_view_quantity(v, t, KENT_PRESSURE, pressure_of(page, point, s.march));
    kent_view_quantity(v, t, KENT_PRESSURE, pressure_of(page, point, s.second));
    if (page->opinions[index].rigid) kent_view_quantity(v, t, KENT_LENGTH, s.rigid);
}

static void print_table(const kent_page *page, size_t index)
{
    const kent_view *v = &page->view;
    const kent_shown length = kent_shown_unit(KENT_LENGTH, v->units);
    const kent_shown pressure = kent_shown_unit(KENT_PRESSURE, v->units);
    const kent_column columns[] = {
        {"point", "", KENT_ALIGN_LEFT, true},
        {"", "", KENT_ALIGN_LEFT, false},
        {"head: march", length.text, KENT_ALIGN_RIGHT, false},
        {"second", length.text, KENT_ALIGN_RIGHT, false},
        {"differs", length.text, KENT_ALIGN_RIGHT, false},
        {"own error", length.text, KENT_ALIGN_RIGHT, false},
        {"of swing", "%", KENT_ALIGN_RIGHT, false},
        {"pressure: march", pressure.text, KENT_ALIGN_RIGHT, false},
        {"second", pressure.text, KENT_ALIGN_RIGHT, false},
        {"rigid", length.text, KENT_ALIGN_RIGHT, false},
    };
    const size_t count = sizeof columns / sizeof columns[0];
    kent_table t = {.columns = columns,
                    .column_count = page->opinions[index].rigid ? count : count - 1};
    for (size_t i = 0; i < page->results->history_count; i++) {
        const int point = page->results->history_points[i];
        if (!isfinite(page->results->scenarios[index].points[point].highest_head)) {
            continue;
        }
        add_row(page, &t, index, point, true);
        add_row(page, &t, index, point, false);
    }
    if (kent_table_print(&t, v->limit, v->out)) {
        kent_text_add(v->out, "%s\n", KENT_TABLE_CUT);
    }
    v->out->failed = v->out->failed || t.failed;
    kent_table_clear(&t);
}

/* ---- in words -------------------------------------------------------------------- */

static void say_title(const kent_page *page, size_t index)
{
    const kent_model *m = page->view.model;
    const kent_scenario_result *s = &page->results->scenarios[index];
    const kent_scenario *of = &m->scenarios[s->scenario];
    kent_text words = {0};
    kent_text_add(&words, "%s", kent_name_in_state(m, of->id, s->state).s);
    if (of->title[0] != '\0') kent_text_add(&words, ": %s", of->title);
    kent_view_say(&page->view, "", &words);
    kent_text_clear(&words);
}

/* "lowest head at V1 differs by 0.8 % of its swing", of the point where that is most.
 */
static void add_worst(const kent_page *page, size_t index, double asked,
                      kent_text *words)
{
    const kent_results *r = page->results;
    const double largest = largest_swing(page, index);
    double worst = -1.0;
    int at = -1;
    bool of_high = true;
    for (size_t i = 0; i < 2 * r->history_count; i++) {
        const int point = r->history_points[i / 2];
        const kent_side s = side_of(page, index, point, i % 2 == 0);
        const double share = share_of(&s, largest);
        if (!(share > worst)) continue;
        worst = share;
        at = point;
        of_high = i % 2 == 0;
    }
    if (at < 0) {
        kent_text_add(words, "Nothing moves at the points shown. ");
        return;
    }
    kent_text_add(
        words, "Most apart: the %s head at %s differs by %.1f %% of its swing",
        of_high ? "highest" : "lowest", page->view.model->points[at].id, 100.0 * worst);
    if (asked > 0.0) {
        kent_text_add(words, " (asked %.0f %%)", 100.0 * asked);
        if (worst > asked) kent_text_add(words, ": more than is asked");
    }
    kent_text_add(words, ". ");
}

/* Whether water parts in the march, while pipes of the second method stay full. */
static bool is_parted(const kent_page *page, size_t index)
{
    return page->view.model->solver.column_separation != KENT_SEPARATION_NONE &&
           (page->opinions[index].report.below_vapour ||
            page->results->scenarios[index].below_vapour > 0);
}

static void say_verdict(const kent_page *page, size_t index)
{
    const kent_opinion *o = &page->opinions[index];
    const bool slow = kent_opinion_is_asked(o);
    const bool asked = slow && !is_parted(page, index);
    kent_text words = {0};
    add_worst(page, index, asked ? KENT_CROSSCHECK_ASKED : 0.0, &words);
    if (isinf(o->ramp)) {
        kent_text_add(&words, "Nothing happens in this scenario.");
    } else if (asked) {
        kent_text_add(&words, "Its quickest event takes %.3g s, 2L/a is %.3g s.",
                      o->ramp, o->back_and_forth);
    } else if (slow) {
        kent_text_add(&words, "Of heads below the vapour limit no agreement is asked.");
    } else {
        kent_text_add(&words,
                      "Its quickest event takes %.3g s, less than 2L/a of %.3g s: of "
                      "fronts so steep no agreement is asked, since cells blunt them.",
                      o->ramp, o->back_and_forth);
    }
    if (o->report.switches > 0) {
        kent_text_add(
            &words,
            " Devices opened or shut by themselves (%zu changes): a slam sends "
            "a front, which cells blunt.",
            o->report.switches);
    }
    kent_text_add(&words, " Second method: %zu cells of at most %s.", o->report.cells,
                  kent_shown_with_unit(KENT_LENGTH, page->view.units, o->cell).text);
    kent_view_say(&page->view, "", &words);
    kent_text_clear(&words);
}

static void say_left_out(const kent_page *page, size_t index)
{
    const kent_opinion *o = &page->opinions[index];
    const size_t below = page->results->scenarios[index].below_vapour;
    kent_text words = {0};
    for (size_t i = 0; i < o->left_out.count; i++) {
        kent_text_add(&words, "%s.", o->left_out.text[i]);
        kent_view_say(&page->view, "Left out: ", &words);
    }
    if (below > 0) {
        kent_text_add(&words,
                      "In the march heads reach the vapour limit at %zu grid point%s.",
                      below, below == 1 ? "" : "s");
        kent_view_say(&page->view, "", &words);
    }
    if (o->rigid) {
        kent_text_add(&words,
                      "Rigid: the same main with water and walls that do not give, a "
                      "third figure since the events are slow against 2L/a.");
        kent_view_say(&page->view, "", &words);
    }
    kent_text_clear(&words);
}

/* Whether there is nothing to compare, and why. */
static bool say_stopped(const kent_page *page, size_t index)
{
    const kent_opinion *o = &page->opinions[index];
    kent_text words = {0};
    if (o->stopped.what[0] == '\0') return false;
    kent_text_add(&words, "Nothing is compared: %s.", o->stopped.what);
    kent_view_say(&page->view, "", &words);
    kent_text_clear(&words);
    return true;
}

static void say_first(const kent_page *page)
{
    kent_text words = {0};
    kent_text_add(&words,
                  "Two methods on one main: the march (method of characteristics, of "
                  "which every other figure comes) and a second one (finite volumes, "
                  "integrated as one system), which shares its data and none of its "
                  "solution. Own error: the second method with half as many cells. "
                  "Swing: highest less lowest of that point in the march; a dash where "
                  "it hardly moves.");
    kent_view_say(&page->view, "", &words);
    kent_text_clear(&words);
}

kent_status kent_report_cross(const kent_results *r, const kent_opinion *opinions,
                              const kent_report_options *o, kent_sink sink)
{
    kent_text out = {0};
    const kent_page page = {
        .results = r,
        .opinions = opinions,
        .view = {.model = r->model,
                 .steadies = r->steadies,
                 .units = o->units,
                 .wide = o->wide,
                 .limit = o->wide ? 0 : KENT_TABLE_LIMIT,
                 .out = &out},
    };
    say_first(&page);
    for (size_t i = 0; i < r->scenario_count; i++) {
        kent_text_add(&out, "\n");
        say_title(&page, i);
        if (say_stopped(&page, i)) continue;
        print_table(&page, i);
        say_verdict(&page, i);
        say_left_out(&page, i);
    }
    if (r->scenario_count == 0) {
        kent_text_add(&out, "\nThe case has no scenario: nothing was compared.\n");
    }
    const kent_status status = kent_sink_flush(sink, &out);
    kent_text_clear(&out);
    return status;
}
