/* `run --sensitivity`: what each fitting's figures do as one thing at a time moves. */
#include "kent_sink.h"
#include "kent_summary.h"
#include "kent_view.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

enum { FITTINGS_SHOWN = 12 }; /* those that move most, unless wide */

static const char *const ENDS[KENT_WAYS] = {"less", "more"};

static const kent_gauge *moved(const kent_sensitivity *s, int what, int way, size_t i)
{
    return s->varied[what][way] ? &s->varied[what][way][i] : NULL;
}

static bool was_run(const kent_sensitivity *s, int what)
{
    for (int way = 0; way < KENT_WAYS; way++) {
        if (s->varied[what][way] || s->stopped[what][way].status) return true;
    }
    return false;
}

static bool any_run(const kent_sensitivity *s)
{
    for (int what = 0; what < KENT_VARIES; what++) {
        if (was_run(s, what)) return true;
    }
    return false;
}

/* ---- the order of fittings ------------------------------------------------------- */

typedef struct kent_mover {
    size_t fitting;
    double by; /* Pa: the most that its highest or lowest pressure moves */
} kent_mover;

static double moves_by(const kent_sensitivity *s, size_t i)
{
    double most = 0.0;
    for (int k = 0; k < KENT_VARIES * KENT_WAYS; k++) {
        const kent_gauge *g = moved(s, k / KENT_WAYS, k % KENT_WAYS, i);
        if (!g) continue;
        most = fmax(most, fabs(g->highest - s->base[i].highest));
        most = fmax(most, fabs(g->lowest - s->base[i].lowest));
    }
    return most;
}

static int by_moves(const void *a, const void *b)
{
    const kent_mover *x = a, *y = b;
    if (x->by != y->by) return x->by > y->by ? -1 : 1;
    return x->fitting < y->fitting ? -1 : 1; /* no two are the same */
}

/* Those that a scenario reaches, what moves most first; NULL: no memory. */
static kent_mover *movers_of(const kent_sensitivity *s, size_t *count)
{
    kent_mover *movers = kent_alloc(s->fitting_count, sizeof *movers);
    *count = 0;
    for (size_t i = 0; movers && i < s->fitting_count; i++) {
        if (isnan(s->base[i].highest)) continue;
        movers[(*count)++] = (kent_mover){i, moves_by(s, i)};
    }
    if (movers && *count > 0) qsort(movers, *count, sizeof *movers, by_moves);
    return movers;
}

/* ---- cells ----------------------------------------------------------------------- */

typedef struct kent_page {
    const kent_results *results;
    const kent_sensitivity *sensitivity;
    kent_view view;
} kent_page;

/* "+0.85": never "-0.00". */
static kent_shown change_text(kent_kind kind, kent_system units, double si)
{
    const int decimals = kent_units_display(kind, units).decimals;
    kent_shown out = kent_shown_number(kent_units_shown(kind, units, si), decimals);
    const size_t length = strlen(out.text);
    const bool nothing = strspn(out.text, "0.") == length;
    if (isfinite(si) && out.text[0] != '-' && !nothing && length + 1 < KENT_SHOWN) {
        memmove(out.text + 1, out.text, length + 1);
        out.text[0] = '+';
    }
    return out;
}

/* What a block or a length is measured by. */
typedef struct kent_measure {
    kent_kind kind;
    double size;
} kent_measure;

static kent_measure measure_of(const kent_gauge *g)
{
    if (isfinite(g->area)) return (kent_measure){KENT_AREA, g->area};
    if (isfinite(g->volume)) return (kent_measure){KENT_VOLUME, g->volume};
    return (kent_measure){KENT_LENGTH, g->held ? g->length : (double)NAN};
}

static kent_shown held_text(const kent_page *page, const kent_gauge *g)
{
    const kent_measure is = measure_of(g);
    kent_shown none = {"not held"};
    if (!g->held) return none;
    if (!isfinite(is.size)) return (kent_shown){KENT_SHOWN_NONE};
    return kent_shown_with_unit(is.kind, page->view.units, is.size);
}

/* How a block moves; where it becomes another kind of block, that one whole. */
static kent_shown block_change(const kent_page *page, const kent_gauge *base,
                               const kent_gauge *g)
{
    const kent_measure was = measure_of(base), is = measure_of(g);
    if (g->held != base->held || g->type != base->type || is.kind != was.kind ||
        isfinite(is.size) != isfinite(was.size)) {
        return held_text(page, g);
    }
    return change_text(is.kind, page->view.units, is.size - was.size);
}

typedef kent_shown (*kent_changed)(const kent_page *page, const kent_gauge *base,
                                   const kent_gauge *g);

static kent_shown highest_change(const kent_page *page, const kent_gauge *base,
                                 const kent_gauge *g)
{
    return change_text(KENT_PRESSURE, page->view.units, g->highest - base->highest);
}

static kent_shown lowest_change(const kent_page *page, const kent_gauge *base,
                                const kent_gauge *g)
{
    return change_text(KENT_PRESSURE, page->view.units, g->lowest - base->lowest);
}

/* Both ways: "-0.85 / +0.91". */
static void change_cell(const kent_page *page, kent_table *t, int what, size_t i,
                        kent_changed changed)
{
    const kent_sensitivity *s = page->sensitivity;
    kent_shown ways[KENT_WAYS];
    for (int way = 0; way < KENT_WAYS; way++) {
        const kent_gauge *g = moved(s, what, way, i);
        const bool stopped = s->stopped[what][way].status != KENT_OK;
        ways[way] =
            g ? changed(page, &s->base[i], g) : (kent_shown){.text = KENT_SHOWN_NONE};
        if (stopped) ways[way] = (kent_shown){.text = "stopped"};
    }
    kent_table_cell(t, "%s / %s", ways[KENT_LESS].text, ways[KENT_MORE].text);
}

/* "less: test", where another load case comes to govern. */
static void governs_cell(const kent_page *page, kent_table *t, int what, size_t i)
{
    const kent_sensitivity *s = page->sensitivity;
    kent_text words = {0};
    for (int way = 0; way < KENT_WAYS; way++) {
        const kent_gauge *g = moved(s, what, way, i);
        if (!g || strcmp(g->governing.s, s->base[i].governing.s) == 0) continue;
        kent_text_add(&words, "%s%s: %s", words.length > 0 ? ", " : "", ENDS[way],
                      g->governing.s[0] != '\0' ? g->governing.s : "nothing");
    }
    kent_table_cell(t, "%s", kent_text_of(&words));
    t->failed = t->failed || words.failed;
    kent_text_clear(&words);
}

/* "wave speed -10/+10 %". */
static kent_shown vary_text(int what)
{
    kent_shown out;
    const double less = kent_variation_of((kent_vary)what, false).factor;
    const double more = kent_variation_of((kent_vary)what, true).factor;
    (void)snprintf(out.text, sizeof out.text, "%s %+.0f/%+.0f %%",
                   kent_vary_word((kent_vary)what), 100.0 * (less - 1.0),
                   100.0 * (more - 1.0));
    return out;
}

/* ---- the table ------------------------------------------------------------------- */

static void fitting_rows(const kent_page *page, kent_table *t, size_t i)
{
    const kent_sensitivity *s = page->sensitivity;
    const kent_gauge *base = &s->base[i];
    bool first = true;
    for (int what = 0; what < KENT_VARIES; what++) {
        if (!was_run(s, what)) continue;
        kent_table_cell(t, "%s", first ? page->view.model->fittings[i].id : "");
        if (first) {
            kent_view_quantity(&page->view, t, KENT_PRESSURE, base->highest);
            kent_table_cell(t, "%s", held_text(page, base).text);
        } else {
            kent_table_cell(t, "%s", "");
            kent_table_cell(t, "%s", "");
        }
        kent_table_cell(t, "%s", kent_vary_word((kent_vary)what));
        change_cell(page, t, what, i, highest_change);
        change_cell(page, t, what, i, lowest_change);
        change_cell(page, t, what, i, block_change);
        governs_cell(page, t, what, i);
        first = false;
    }
}

static void print_table(const kent_page *page, const kent_mover *movers, size_t count)
{
    const kent_view *v = &page->view;
    const kent_shown bar = kent_shown_unit(KENT_PRESSURE, v->units);
    const kent_column columns[] = {
        {"point", "", KENT_ALIGN_LEFT, true},
        {"highest", bar.text, KENT_ALIGN_RIGHT, false},
        {"held by", "", KENT_ALIGN_RIGHT, false},
        {"moved", "", KENT_ALIGN_LEFT, false},
        {"highest", bar.text, KENT_ALIGN_RIGHT, false},
        {"lowest", bar.text, KENT_ALIGN_RIGHT, false},
        {"held by", "", KENT_ALIGN_RIGHT, false},
        {"then governs", "", KENT_ALIGN_LEFT, true},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < count; i++) {
        fitting_rows(page, &t, movers[i].fitting);
    }
    if (kent_table_print(&t, v->limit, v->out)) {
        kent_text_add(v->out, "%s\n", KENT_TABLE_CUT);
    }
    v->out->failed = v->out->failed || t.failed;
    kent_table_clear(&t);
}

/* ---- in words -------------------------------------------------------------------- */

static void say_moved(const kent_page *page)
{
    const kent_sensitivity *s = page->sensitivity;
    bool first = true;
    kent_text words = {0};
    kent_text_add(&words, "Sensitivity, one thing moved at a time: ");
    for (int what = 0; what < KENT_VARIES; what++) {
        if (!was_run(s, what)) continue;
        kent_text_add(&words, "%s%s", first ? "" : ", ", vary_text(what).text);
        first = false;
    }
    if (was_run(s, KENT_VARY_CHECK_DELAY)) {
        kent_text_add(&words, " (an ideal check valve: %.1f s)", KENT_VARY_IDEAL_DELAY);
    }
    kent_text_add(&words,
                  ". Changes stand less / more against the same run with nothing "
                  "moved, all on the coarser grid; the grid bands above stand beside "
                  "them.");
    kent_view_say(&page->view, "", &words);
    kent_text_clear(&words);
}

static void say_not_run(const kent_page *page)
{
    const kent_sensitivity *s = page->sensitivity;
    bool first = true;
    kent_text words = {0};
    for (int what = 0; what < KENT_VARIES; what++) {
        if (was_run(s, what)) continue;
        kent_text_add(&words, "%s%s",
                      first ? "Not run, since nothing here hangs on it: " : ", ",
                      kent_vary_word((kent_vary)what));
        first = false;
    }
    if (!first) kent_text_add(&words, ".");
    if (words.length > 0) kent_view_say(&page->view, "", &words);
    for (int k = 0; k < KENT_VARIES * KENT_WAYS; k++) {
        const kent_error *e = &s->stopped[k / KENT_WAYS][k % KENT_WAYS];
        if (!e->status) continue;
        kent_text_add(&words, "%s, %s: the march stopped: %s",
                      kent_vary_word((kent_vary)(k / KENT_WAYS)), ENDS[k % KENT_WAYS],
                      e->what);
        kent_view_say(&page->view, "!  ", &words);
    }
    page->view.out->failed = page->view.out->failed || words.failed;
    kent_text_clear(&words);
}

void kent_sensitivity_table(const kent_results *r, const kent_report_options *o,
                            kent_text *out)
{
    const kent_page page = {.results = r,
                            .sensitivity = r->sensitivity,
                            .view = {.model = r->model,
                                     .units = o->units,
                                     .wide = o->wide,
                                     .limit = o->wide ? 0 : KENT_TABLE_LIMIT,
                                     .out = out}};
    size_t count = 0;
    kent_text_add(out, "\n");
    if (!any_run(r->sensitivity)) {
        kent_text_add(out, "Sensitivity: nothing was run, since no scenario moves "
                           "anything here.\n");
        return;
    }
    kent_mover *movers = movers_of(r->sensitivity, &count);
    if (!movers) {
        out->failed = true;
        return;
    }
    const bool whole = o->wide || count <= FITTINGS_SHOWN;
    const size_t shown = whole ? count : FITTINGS_SHOWN;
    say_moved(&page);
    kent_text_add(out, "\n");
    print_table(&page, movers, shown);
    if (!whole) {
        kent_text_add(out, "The %zu that move most; all %zu with --wide.\n", shown,
                      count);
    }
    say_not_run(&page);
    free(movers);
}

/* ---- sensitivity.csv ------------------------------------------------------------- */

/* A further field: a number to ten digits, empty where there is none. */
static void add_number(kent_text *out, double value)
{
    kent_text_add(out, isfinite(value) ? ",%.10g" : ",", value);
}

static void csv_row(const kent_results *r, size_t i, const char *what, double factor,
                    const kent_gauge *g, kent_text *out)
{
    kent_summary_field(out, r->model->fittings[i].id);
    kent_text_add(out, ",%s", what);
    add_number(out, factor);
    if (!g) {
        kent_text_add(out, ",stopped,,,,,,,,\n");
        return;
    }
    kent_text_add(out, ",done");
    add_number(out, g->highest);
    add_number(out, g->lowest);
    kent_text_add(out, ",%s,%s", g->held ? "yes" : "no", kent_block_word(g->type));
    add_number(out, g->area);
    add_number(out, g->volume);
    add_number(out, g->length);
    kent_text_add(out, ",");
    kent_summary_field(out, g->governing.s);
    kent_text_add(out, "\n");
}

static void csv_rows(const kent_results *r, size_t i, kent_text *out)
{
    const kent_sensitivity *s = r->sensitivity;
    csv_row(r, i, "nothing", 1.0, &s->base[i], out);
    for (int k = 0; k < KENT_VARIES * KENT_WAYS; k++) {
        const int what = k / KENT_WAYS, way = k % KENT_WAYS;
        const kent_gauge *g = moved(s, what, way, i);
        if (!g && !s->stopped[what][way].status) continue;
        const kent_variation v = kent_variation_of((kent_vary)what, way == KENT_MORE);
        csv_row(r, i, kent_vary_word(v.what), v.factor, g, out);
    }
}

kent_status kent_report_sensitivity_csv(const kent_results *r, kent_sink sink)
{
    kent_text out = {0};
    kent_status status = KENT_OK;
    kent_text_add(&out, "fitting,moved,factor,march,highest_Pa,lowest_Pa,held,block,"
                        "bearing_area_m2,volume_m3,restrained_length_m,governed by\n");
    for (size_t i = 0; !status && i < r->sensitivity->fitting_count; i++) {
        csv_rows(r, i, &out);
        status = kent_sink_flush(sink, &out);
    }
    if (!status) status = kent_sink_flush(sink, &out);
    kent_text_clear(&out);
    return status;
}
