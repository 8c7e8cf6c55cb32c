#include "kent_imprint.h"
#include "kent_page.h"
#include "kent_pressures.h"
#include "kent_said.h"
#include "kent_shown.h"
#include "kent_sink.h"
#include "kent_summary.h"
#include "kent_table.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* ---- the page -------------------------------------------------------------------- */

/* 0: a, 25: z, 26: aa ... */
static void letter_of(size_t index, char out[4])
{
    char backwards[4] = {0};
    size_t length = 0;
    for (size_t n = index + 1; n > 0 && length < 3; n = (n - 1) / 26) {
        backwards[length++] = (char)('a' + (n - 1) % 26);
    }
    for (size_t i = 0; i < length; i++) {
        out[i] = backwards[length - 1 - i];
    }
    out[length] = '\0';
}

static void number_systems(kent_page *page)
{
    const kent_systems *all = &page->results->restraints->systems;
    for (size_t i = 0; i < all->count; i++) {
        for (size_t k = 0; k < all->at[i].fitting_count; k++) {
            page->system[all->fittings[all->at[i].fitting_first + k]] = i + 1;
        }
    }
}

static kent_status page_open(kent_page *page, const kent_report_options *o)
{
    const kent_restraints *all = page->results->restraints;
    page->letter = kent_alloc(page->model->fitting_count, sizeof *page->letter);
    page->system = kent_alloc(page->model->fitting_count, sizeof *page->system);
    if (!page->letter || !page->system) return KENT_E_NOMEM;
    number_systems(page);
    const kent_status status =
        kent_listing_make(page->results, o, true, &page->listing);
    size_t lettered = 0;
    for (size_t k = 0; k < page->listing.count; k++) {
        const size_t i = page->listing.fitting[k];
        const kent_holding *h = &all->fittings[i];
        if (!kent_shown_not_held(h) || h->cautions.count == 0) continue;
        letter_of(lettered++, page->letter[i]);
    }
    return status;
}

static void page_close(kent_page *page)
{
    kent_listing_clear(&page->listing);
    free(page->system);
    free(page->letter);
}

static const char *plural(size_t count) { return count == 1 ? "" : "s"; }

static void print_title(kent_page *page)
{
    const kent_model *m = page->model;
    kent_text facts = {0};
    kent_table_paragraph(page->out, page->limit, "",
                         m->title[0] != '\0' ? m->title : "(untitled)");
    kent_imprint_top(m, page->limit, page->out);
    kent_text_add(&facts, "%zu fitting%s · %zu scenario%s · gauge pressure",
                  m->fitting_count, plural(m->fitting_count),
                  page->results->scenario_count, plural(page->results->scenario_count));
    if (isfinite(m->water.temperature)) {
        const kent_shown t =
            kent_shown_with_unit(KENT_TEMPERATURE, page->units, m->water.temperature);
        kent_text_add(&facts, " · water %s", t.text);
    }
    kent_table_paragraph(page->out, page->limit, "", kent_text_of(&facts));
    page->out->failed = page->out->failed || facts.failed;
    kent_text_clear(&facts);
    kent_text_add(page->out, "\n");
}

/* ---- the table of fittings ------------------------------------------------------- */

enum {
    STATION,
    POINT,
    FITTING,
    SIZE,
    GOVERNED,
    PRESSURE,
    THRUST,
    PUSHES,
    HELD_BY,
    FACTOR,
    LOAD,
    FITTING_COLUMNS
};

/* The cells of one part. again: it is not the fitting's first, and what pushes is the
 * same instant as in the row above. */
static void part_cells(const kent_page *page, size_t i, const kent_part *part,
                       bool again, kent_room room, kent_table *t)
{
    const kent_model *m = page->model;
    const kent_system units = page->units;
    const kent_fitting *f = &m->fittings[i];
    const kent_holding *h = &page->results->restraints->fittings[i];
    const kent_fitting_loads *loads = &page->results->loads->fittings[i];
    const kent_instant *at = kent_part_instant(loads, part);
    const kent_vec3 thrust = at ? at->balance.thrust : (kent_vec3){NAN, NAN, NAN};
    const char *letter = page->letter[i];
    const kent_shown holding = kent_shown_part(m, f, h, part, units, room);
    /* one decimal less than elsewhere: the pressures have a table of their own */
    const kent_shown pressure = kent_shown_number(
        kent_units_shown(KENT_PRESSURE, units, at ? at->pressure : NAN),
        kent_units_display(KENT_PRESSURE, units).decimals - 1);

    if (again) {
        for (int blank = 0; blank < 4; blank++) {
            kent_table_cell(t, "%s", "");
        }
    } else {
        kent_table_cell(t, "%s", kent_shown_governing(loads, part, room).text);
        kent_table_cell(t, "%s", pressure.text);
        kent_table_cell(
            t, "%s",
            kent_shown_quantity(KENT_FORCE, units, kent_vec3_length(thrust)).text);
        kent_table_cell(t, "%s", kent_shown_push(m, f, thrust, units, room).text);
    }
    if (part->joints && page->system[i] > 0) {
        kent_table_cell(t, "%s, S%zu", holding.text, page->system[i]);
    } else if (letter[0] == '\0') {
        kent_table_cell(t, "%s", holding.text);
    } else {
        kent_table_cell(t, room == KENT_ROOMY ? "%s, see %s" : "%s, %s", holding.text,
                        letter);
    }
    kent_table_cell(t, "%s", kent_shown_number(part->factor_reached, 2).text);
    kent_table_cell(t, "%s", kent_shown_number(part->utilisation, 2).text);
}

static bool same_push(const kent_fitting_loads *loads, const kent_part *a,
                      const kent_part *b)
{
    const kent_instant *x = kent_part_instant(loads, a);
    const kent_instant *y = kent_part_instant(loads, b);
    if (!x || !y || a->governing != b->governing) return false;
    return (isnan(x->time) && isnan(y->time)) || x->time == y->time;
}

static void fitting_rows(const kent_page *page, size_t i, kent_room room, kent_table *t)
{
    const kent_model *m = page->model;
    const kent_fitting *f = &m->fittings[i];
    const kent_fitting_loads *loads = &page->results->loads->fittings[i];
    kent_part parts[KENT_PARTS];
    const size_t count =
        kent_shown_parts(loads, &page->results->restraints->fittings[i], parts);
    for (size_t p = 0; p < count; p++) {
        if (p == 0) {
            kent_table_cell(t, "%s", kent_shown_station(page->units, f->station).text);
            kent_table_cell(t, "%s", f->id);
            kent_table_cell(t, "%s", kent_shown_fitting(m, f, page->units, room).text);
            kent_table_cell(t, "%s", kent_shown_size(m, f, page->units).text);
        } else {
            for (int blank = 0; blank < 4; blank++) {
                kent_table_cell(t, "%s", "");
            }
        }
        const bool again = p > 0 && same_push(loads, &parts[0], &parts[p]);
        part_cells(page, i, &parts[p], again, room, t);
    }
}

static bool any_straps(const kent_page *page)
{
    for (size_t i = 0; i < page->listing.count; i++) {
        const kent_holding *h =
            &page->results->restraints->fittings[page->listing.fitting[i]];
        if (h->held && h->straps.legs > 0) return true;
    }
    return false;
}

/* Prints the table with so much room; false where it needs more and there is less to
 * be had. */
static bool try_fittings(kent_page *page, kent_room room)
{
    const bool si = page->units == KENT_SI, roomy = room == KENT_ROOMY;
    const kent_shown inch = kent_shown_unit(KENT_DIAMETER, page->units);
    const kent_shown bar = kent_shown_unit(KENT_PRESSURE, page->units);
    const kent_shown kn = kent_shown_unit(KENT_FORCE, page->units);
    const kent_shown m = kent_shown_unit(KENT_LENGTH, page->units);
    char arrows[KENT_SHOWN + 16], sides[2 * KENT_SHOWN + 32];
    (void)snprintf(arrows, sizeof arrows, "↑ ↓ in %s", kn.text);
    const bool tied = any_straps(page);
    (void)snprintf(sides, sizeof sides, "w × h × t %s%s%s%s", tied ? "" : "in ", m.text,
                   tied ? ", ø " : "", tied ? inch.text : "");
    const kent_column columns[FITTING_COLUMNS] = {
        [STATION] = {roomy ? "station" : "sta.", "", KENT_ALIGN_LEFT, false},
        [POINT] = {"point", "", KENT_ALIGN_LEFT, true},
        [FITTING] = {"fitting", "", KENT_ALIGN_LEFT, true},
        [SIZE] = {si ? "DN" : "size", si ? "" : inch.text, KENT_ALIGN_RIGHT, false},
        [GOVERNED] = {"governed by", "", KENT_ALIGN_LEFT, true},
        [PRESSURE] = {roomy ? "pressure" : "", bar.text, KENT_ALIGN_RIGHT, false},
        [THRUST] = {roomy ? "thrust" : "", kn.text, KENT_ALIGN_RIGHT, false},
        [PUSHES] = {"pushes", arrows, KENT_ALIGN_LEFT, false},
        [HELD_BY] = {"held by", sides, KENT_ALIGN_LEFT, false},
        [FACTOR] = {"×SF", "", KENT_ALIGN_RIGHT, false},
        [LOAD] = {"load", "/res", KENT_ALIGN_RIGHT, false},
    };
    kent_table t = {.columns = columns, .column_count = FITTING_COLUMNS};
    for (size_t i = 0; i < page->listing.count; i++) {
        fitting_rows(page, page->listing.fitting[i], room, &t);
    }
    const size_t gaps = FITTING_COLUMNS - 1; /* columns can stand closer by one each */
    const size_t least = kent_table_width(&t) - (roomy ? 0 : gaps);
    const bool fits = page->limit == 0 || least <= page->limit || room == KENT_BRIEF;
    if (fits && kent_table_print(&t, page->limit, page->out)) page->cut = true;
    kent_table_clear(&t);
    return fits;
}

static void print_fittings(kent_page *page)
{
    for (kent_room room = KENT_ROOMY; room <= KENT_BRIEF; room++) {
        if (try_fittings(page, room)) return;
    }
}

/* ---- the notes under it ---------------------------------------------------------- */

static void join_notes(const kent_notes *notes, kent_text *words)
{
    for (size_t i = 0; i < notes->count; i++) {
        kent_text_add(words, "%s%s", i > 0 ? "; " : "", notes->text[i]);
    }
}

/* Why each fitting that is not held is not, and what would help. */
static void print_refusals(kent_page *page)
{
    for (size_t i = 0; i < page->listing.count; i++) {
        const size_t f = page->listing.fitting[i];
        kent_text lead = {0}, words = {0};
        if (page->letter[f][0] == '\0') continue;
        kent_text_add(&lead, "%s  ", page->letter[f]);
        kent_text_add(&words, "%s: ", page->model->fittings[f].id);
        join_notes(&page->results->restraints->fittings[f].cautions, &words);
        kent_table_paragraph(page->out, page->limit, kent_text_of(&lead),
                             kent_text_of(&words));
        page->out->failed = page->out->failed || lead.failed || words.failed;
        kent_text_clear(&words);
        kent_text_clear(&lead);
    }
}

/* "Factor asked 1.50", or the range where load cases ask for different ones. */
static void add_factors(const kent_page *page, kent_text *words)
{
    double least = NAN, most = NAN;
    for (size_t i = 0; i < page->model->fitting_count; i++) {
        const double asked = page->results->restraints->fittings[i].factor_asked;
        least = fmin(least, asked);
        most = fmax(most, asked);
    }
    if (isnan(least)) return;
    kent_text_add(words, "×SF is the factor reached; asked %.2f", least);
    if (most > least) kent_text_add(words, " to %.2f by load case", most);
    kent_text_add(words, ". ");
}

/* How many rows there are, where they are not all. */
static void add_listed(const kent_page *page, kent_text *words)
{
    const size_t all = page->model->fitting_count;
    if (page->listing.count == all) return;
    kent_text_add(words, "Listed: %zu of %zu fittings. ", page->listing.count, all);
}

/* "14.5 m³" */
static void add_volume(const kent_page *page, double volume, kent_text *words)
{
    const kent_shown number =
        kent_shown_number(kent_units_shown(KENT_VOLUME, page->units, volume), 1);
    kent_text_add(words, "%s %s", number.text,
                  kent_shown_unit(KENT_VOLUME, page->units).text);
}

/* Concrete, what is dug for it and what is formed; when it may be tested. */
static void add_blocks(const kent_page *page, kent_text *words)
{
    const kent_restraints *all = page->results->restraints;
    const kent_quantities *q = &all->quantities;
    kent_text_add(words, "Concrete ");
    add_volume(page, all->concrete, words);
    if (q->concrete > 0.0) {
        kent_text_add(words, ", excavation ");
        if (isnan(q->excavation)) {
            kent_text_add(words, "not known without a cover");
        } else {
            add_volume(page, q->excavation, words);
        }
        kent_text_add(
            words, ", forms %s %s",
            kent_shown_number(kent_units_shown(KENT_AREA, page->units, q->formed), 1)
                .text,
            kent_shown_unit(KENT_AREA, page->units).text);
        if (all->age > 0.0) {
            kent_text_add(words, ", no test before %.0f days", all->age / 86400.0);
        }
    }
    if (all->not_held > 0) {
        kent_text_add(words, ", without the %zu fitting%s that nothing here can hold",
                      all->not_held, plural(all->not_held));
    }
    kent_text_add(words, ". ");
}

/* Restrained pipe in all; each joint counts once. */
static void add_joints(const kent_page *page, kent_text *words)
{
    const kent_systems *all = &page->results->restraints->systems;
    double length = 0.0;
    int joints = 0;
    bool counted = true;
    if (all->count == 0) return;
    for (size_t i = 0; i < all->count; i++) {
        length += all->at[i].length;
        joints += all->at[i].joints;
        counted = counted && all->at[i].joints > 0;
    }
    if (counted) {
        kent_text_add(words, "Restrained: %d joint%s over ", joints,
                      plural((size_t)joints));
    } else {
        kent_text_add(words, "Restrained: every joint over ");
    }
    kent_text_add(words, "%s. ",
                  kent_shown_with_unit(KENT_LENGTH, page->units, length).text);
}

static void print_totals(kent_page *page)
{
    const size_t assumed = page->model->assumed.count;
    kent_text words = {0};
    add_listed(page, &words);
    add_factors(page, &words);
    add_blocks(page, &words);
    add_joints(page, &words);
    if (page->results->incomplete) kent_text_add(&words, "Load cases: not complete. ");
    if (assumed > 0) {
        kent_text_add(&words, "%zu value%s assumed: see `kentledge check`.", assumed,
                      plural(assumed));
    }
    kent_page_say(page, "", &words);
    if (page->cut) {
        kent_table_paragraph(page->out, page->limit, "", KENT_TABLE_CUT);
    }
}

/* ---- the table of pressures ------------------------------------------------------ */

static bool any_recurs(const kent_model *m)
{
    for (size_t i = 0; i < m->scenario_count; i++) {
        if (m->scenarios[i].class_of == KENT_RECURRING) return true;
    }
    return false;
}

/* Whether any pipe has a rating with surge or under test of its own that something is
 * held against. */
static bool has_ratings(const kent_page *page, kent_rating rating)
{
    const kent_model *m = page->model;
    if (rating == KENT_RATING_RECURRING && !any_recurs(m)) return false;
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *p = &m->pipes[i];
        const double own[KENT_RATINGS] = {p->pressure_rating, p->surge_rating,
                                          p->recurring_rating, p->test_rating};
        if (!isnan(own[rating])) return true;
    }
    return false;
}

/* Whether a column stands for anything in this case. */
static bool has_column(const kent_page *page, int column)
{
    if (column == KENT_PRESSURE_SHUT_OFF) return page->model->pump_count > 0;
    return column != KENT_PRESSURE_FUTURE || !isnan(page->model->loads.future_pressure);
}

static void pressure_row(const kent_page *page, size_t i, kent_table *t)
{
    const kent_pressures p = kent_pressures_of(page->results, i);
    kent_table_cell(t, "%s", page->model->fittings[i].id);
    for (int k = 0; k <= KENT_PRESSURE_LOWEST; k++) {
        if (!has_column(page, k)) continue;
        const kent_shown number =
            kent_shown_quantity(KENT_PRESSURE, page->units, p.at[k]);
        kent_table_cell(t, "%s%s", number.text, k == p.governs ? "*" : " ");
    }
    for (int k = 0; k < KENT_RATINGS; k++) {
        if (k > KENT_RATING_SERVICE && !has_ratings(page, (kent_rating)k)) continue;
        const kent_shown number =
            kent_shown_quantity(KENT_PRESSURE, page->units, p.rating[k]);
        kent_table_cell(t, "%s ", number.text);
    }
}

static void print_pressures(kent_page *page)
{
    const kent_shown unit = kent_shown_unit(KENT_PRESSURE, page->units);
    const char *bar = unit.text;
    static const char *const HEADS[] = {"steady ", "static ",  "shut-off ", "test ",
                                        "future ", "highest ", "lowest "};
    static const char *const RATED[KENT_RATINGS] = {"rating ", "+surge ", "+often ",
                                                    "tested "};
    enum { MOST = 1 + sizeof HEADS / sizeof HEADS[0] + KENT_RATINGS };
    kent_column columns[MOST] = {{"point", "", KENT_ALIGN_LEFT, true}};
    kent_table t = {.columns = columns, .column_count = 1};
    for (size_t k = 1; k < MOST; k++) {
        columns[k] = (kent_column){"", bar, KENT_ALIGN_RIGHT, false};
    }
    for (int k = 0; k <= KENT_PRESSURE_LOWEST; k++) {
        if (!has_column(page, k)) continue;
        columns[t.column_count++].head = HEADS[k];
    }
    columns[t.column_count++].head = RATED[KENT_RATING_SERVICE];
    for (int k = KENT_RATING_SURGE; k < KENT_RATINGS; k++) {
        if (!has_ratings(page, (kent_rating)k)) continue;
        columns[t.column_count++].head = RATED[k];
    }
    for (size_t i = 0; i < page->listing.count; i++) {
        const size_t f = page->listing.fitting[i];
        if (page->model->fittings[f].point >= 0) pressure_row(page, f, &t);
    }
    if (t.cell_count > 0) {
        kent_text_add(page->out, "\n");
        if (kent_table_print(&t, page->limit, page->out)) page->cut = true;
        kent_text_add(page->out, "*  the load case that governs\n");
    }
    kent_table_clear(&t);
}

/* ---- what the scenarios did ------------------------------------------------------ */

static void add_extreme(const kent_page *page, const kent_extreme *e, kent_text *words)
{
    const kent_model *m = page->model;
    kent_text_add(words, "%s",
                  kent_shown_with_unit(KENT_PRESSURE, page->units, e->pressure).text);
    if (e->point >= 0) kent_text_add(words, " at %s", m->points[e->point].id);
    if (e->span >= 0) {
        kent_text_add(words, " in pipe %s, %s from its start", m->spans[e->span].id,
                      kent_said_whole(KENT_LENGTH, page->units, e->chainage).s);
    }
    if (isfinite(e->time)) kent_text_add(words, " (%.1f s)", e->time);
}

/* The whole difference between two grids, m of head, to two digits. */
static void add_band(const kent_page *page, double head, kent_text *words)
{
    const kent_model *m = page->model;
    if (!isfinite(head)) return;
    const double band = head * m->water.density * m->gravity;
    const double shown = kent_units_shown(KENT_PRESSURE, page->units, band);
    const kent_shown unit = kent_shown_unit(KENT_PRESSURE, page->units);
    if (shown < 0.001) {
        kent_text_add(words, "; grid band under 0.001 %s", unit.text);
    } else {
        kent_text_add(words, "; grid band ±%.2g %s", shown, unit.text);
    }
}

static void print_scenario(kent_page *page, size_t index)
{
    const kent_model *m = page->model;
    const kent_scenario_result *s = &page->results->scenarios[index];
    const kent_scenario *given = &m->scenarios[s->scenario];
    const kent_extreme high = kent_extreme_highest(page->results, index);
    const kent_extreme low = kent_extreme_lowest(page->results, index);
    kent_text words = {0};
    kent_text_add(&words, "%s", kent_name_in_state(m, given->id, s->state).s);
    if (given->title[0] != '\0' && strcmp(given->title, given->id) != 0) {
        kent_text_add(&words, ": %s", given->title);
    }
    kent_text_add(&words, " (%s, %.0f s). Highest ", kent_class_word(given->class_of),
                  given->duration);
    add_extreme(page, &high, &words);
    kent_text_add(&words, ", lowest ");
    add_extreme(page, &low, &words);
    add_band(page, s->uncertainty, &words);
    kent_text_add(&words, ".");
    kent_table_paragraph(page->out, page->limit, "", kent_text_of(&words));
    page->out->failed = page->out->failed || words.failed;
    kent_text_clear(&words);
}

/* The worst of all scenarios; said only where there are several. */
static void print_overall(kent_page *page)
{
    const size_t count = page->results->scenario_count;
    kent_extreme high = {.pressure = NAN}, low = {.pressure = NAN};
    double band = NAN;
    kent_text words = {0};
    if (count < 2) return;
    for (size_t i = 0; i < count; i++) {
        const int scenario = page->results->scenarios[i].scenario;
        if (page->model->scenarios[scenario].for_comparison) continue;
        const kent_extreme h = kent_extreme_highest(page->results, i);
        const kent_extreme l = kent_extreme_lowest(page->results, i);
        if (!(h.pressure <= high.pressure)) high = h;
        if (!(l.pressure >= low.pressure)) low = l;
        band = fmax(band, page->results->scenarios[i].uncertainty);
    }
    kent_text_add(&words, "Over all: highest ");
    add_extreme(page, &high, &words);
    kent_text_add(&words, ", lowest ");
    add_extreme(page, &low, &words);
    add_band(page, band, &words);
    kent_text_add(&words, ".");
    kent_table_paragraph(page->out, page->limit, "", kent_text_of(&words));
    page->out->failed = page->out->failed || words.failed;
    kent_text_clear(&words);
}

static void print_scenarios(kent_page *page)
{
    const size_t count = page->results->scenario_count;
    if (page->model->span_count == 0) return;
    kent_text_add(page->out, "\n");
    for (size_t i = 0; i < count; i++) {
        print_scenario(page, i);
    }
    print_overall(page);
    if (count == 0) {
        kent_text_add(page->out,
                      "No scenario was run: no surge is in these figures.\n");
    }
}

/* ---- --wide, and the end --------------------------------------------------------- */

/* Every further column of summary.csv, in tables of what belongs together. */
static void print_rest(kent_page *page)
{
    const kent_report_options o = {.units = page->units, .wide = true};
    kent_summary_table(page->results, &o, &page->listing, page->out);
}

static void print_end(kent_page *page)
{
    kent_text_add(page->out, "\n");
    kent_imprint_end(page->model, page->limit, page->out);
}

kent_status kent_report_tables(const kent_results *r, const kent_report_options *o,
                               kent_sink sink)
{
    kent_text out = {0};
    kent_page page = {.results = r,
                      .model = r->model,
                      .units = o->units,
                      .wide = o->wide,
                      .limit = o->wide ? 0 : KENT_TABLE_LIMIT,
                      .out = &out};
    kent_status status = page_open(&page, o);
    if (status) goto done;
    print_title(&page);
    print_fittings(&page);
    kent_text_add(&out, "\n");
    print_refusals(&page);
    kent_page_cautions(&page);
    print_totals(&page);
    kent_page_either(&page);
    kent_page_systems(&page);
    kent_page_pulls(&page);
    kent_page_runs(&page);
    print_pressures(&page);
    print_scenarios(&page);
    kent_page_limits(&page);
    kent_page_devices(&page);
    kent_page_cavities(&page);
    kent_page_twins(&page);
    kent_page_screening(&page);
    kent_page_swings(&page);
    if (o->wide) print_rest(&page);
    if (r->sensitivity) kent_sensitivity_table(r, o, &out);
    print_end(&page);
    status = kent_sink_flush(sink, &out);
done:
    page_close(&page);
    kent_text_clear(&out);
    return status;
}
