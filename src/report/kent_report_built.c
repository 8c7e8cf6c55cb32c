/* What was built, told: the factor reached in each load case beside the one asked,
 * never a verdict. */
#include "kent_imprint.h"
#include "kent_json.h"
#include "kent_page.h"
#include "kent_shown.h"
#include "kent_sink.h"
#include "kent_summary.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

/* One fitting of the report. */
typedef struct built_row {
    const kent_results *r;
    const kent_model *m;
    kent_system units;
    const kent_fitting *fitting;
    const kent_fitting_loads *loads;
    const kent_holding *holding;
    const kent_as_built *built;
    const kent_built *given; /* NULL: nothing is stated */
} built_row;

static built_row row_of(const kent_results *r, kent_system units, int fitting)
{
    const kent_model *m = r->model;
    built_row row = {.r = r,
                     .m = m,
                     .units = units,
                     .fitting = &m->fittings[fitting],
                     .loads = &r->loads->fittings[fitting],
                     .holding = &r->restraints->fittings[fitting]};
    row.built = &row.holding->as_built;
    for (size_t i = 0; i < m->built_count; i++) {
        if (strcmp(m->built[i].fitting, row.fitting->id) == 0) row.given = &m->built[i];
    }
    return row;
}

static const kent_load_case *case_of(const built_row *row,
                                     const kent_built_reach *reach)
{
    return &row->loads->cases[reach->load_case];
}

/* "block, sideways", "leg towards T1". */
static kent_shown part_of(const built_row *row, const kent_built_reach *reach)
{
    kent_shown s;
    if (reach->port < 0) {
        (void)snprintf(s.text, sizeof s.text, "block, %s",
                       kent_shown_sense(reach->sense));
        return s;
    }
    const int toward =
        row->m->ports[row->fitting->port_first + (size_t)reach->port].toward;
    (void)snprintf(s.text, sizeof s.text, "leg towards %.60s",
                   toward >= 0 ? row->m->points[toward].id : KENT_SHOWN_NONE);
    return s;
}

static void add_sides(const built_row *row, double a, double b, double c,
                      kent_text *out)
{
    kent_text_add(out, "%s × %s × %s",
                  kent_shown_quantity(KENT_LENGTH, row->units, a).text,
                  kent_shown_quantity(KENT_LENGTH, row->units, b).text,
                  kent_shown_quantity(KENT_LENGTH, row->units, c).text);
}

/* What stands there. */
static void add_built(const built_row *row, kent_text *out)
{
    const kent_built *g = row->given;
    const char *sep = "";
    if (!(isnan(g->width) && isnan(g->height))) {
        add_sides(row, g->width, g->height, g->thickness, out);
        sep = ", ";
    }
    if (g->face_width > 0.0) {
        kent_text_add(out, "%sface ", sep);
        add_sides(row, g->face_width, g->face_height, g->face_thickness, out);
        sep = ", ";
    }
    for (size_t i = 0; i < g->leg_count; i++) {
        const kent_built_leg *leg = &row->m->built_legs[g->leg_first + i];
        kent_text_add(out, "%sjoints %s towards %s", sep,
                      kent_shown_with_unit(KENT_LENGTH, row->units, leg->length).text,
                      row->m->points[leg->toward].id);
        sep = ", ";
    }
}

static void add_designed(const built_row *row, kent_text *out)
{
    const kent_holding *h = row->holding;
    kent_part parts[KENT_PARTS];
    const size_t count = kent_shown_parts(row->loads, h, parts);
    for (size_t i = 0; i < count; i++) {
        kent_text_add(
            out, "%s%s", i > 0 ? ", " : "",
            kent_shown_part(row->m, row->fitting, h, &parts[i], row->units, KENT_ROOMY)
                .text);
    }
    if (h->leg_count > 0 && h->chosen != KENT_RESTRAINED_JOINTS) {
        kent_text_add(
            out, "; joints in its place %s",
            kent_shown_with_unit(KENT_LENGTH, row->units, h->restrained_length).text);
    }
}

/* ---- tables ---------------------------------------------------------------------- */

static void print_reaches(const built_row *row, size_t limit, kent_text *out)
{
    const kent_column columns[] = {
        {.head = "", .unit = ""},
        {.head = "part", .unit = ""},
        {.head = "load case", .unit = "", .elastic = true},
        {.head = "load",
         .unit = kent_units_display(KENT_FORCE, row->units).unit,
         .align = KENT_ALIGN_RIGHT},
        {.head = "holds",
         .unit = kent_units_display(KENT_FORCE, row->units).unit,
         .align = KENT_ALIGN_RIGHT},
        {.head = "reached", .unit = "", .align = KENT_ALIGN_RIGHT},
        {.head = "asked", .unit = "", .align = KENT_ALIGN_RIGHT},
        {.head = "use", .unit = "", .align = KENT_ALIGN_RIGHT},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < row->built->count; i++) {
        const kent_built_reach *reach = &row->built->reaches[i];
        kent_table_cell(&t, "%s", (int)i == row->built->worst ? "*" : "");
        kent_table_cell(&t, "%s", part_of(row, reach).text);
        kent_table_cell(&t, "%s", case_of(row, reach)->title.s);
        kent_table_cell(&t, "%s",
                        kent_shown_quantity(KENT_FORCE, row->units, reach->load).text);
        kent_table_cell(
            &t, "%s",
            kent_shown_quantity(KENT_FORCE, row->units, reach->resistance).text);
        kent_table_cell(&t, "%s", kent_shown_number(reach->reached, 2).text);
        kent_table_cell(&t, "%s", kent_shown_number(reach->asked, 2).text);
        kent_table_cell(&t, "%s", kent_shown_number(reach->utilisation, 2).text);
    }
    if (t.cell_count > 0) (void)kent_table_print(&t, limit, out);
    kent_table_clear(&t);
}

static void say(kent_text *out, size_t limit, const char *lead, kent_text *words)
{
    kent_table_paragraph(out, limit, lead, kent_text_of(words));
    out->failed = out->failed || words->failed;
    kent_text_reset(words);
}

static void print_fitting(const built_row *row, size_t limit, kent_text *out)
{
    kent_text words = {0};
    const kent_as_built *b = row->built;
    kent_text_add(
        &words, "%s, %s", row->fitting->id,
        kent_shown_fitting(row->m, row->fitting, row->units, KENT_ROOMY).text);
    kent_text_add(out, "\n");
    say(out, limit, "", &words);
    if (!row->given) {
        kent_text_add(out, "not in as_built\n");
        goto done;
    }
    kent_text_add(&words, "built %s: ", kent_shown_unit(KENT_LENGTH, row->units).text);
    add_built(row, &words);
    say(out, limit, "", &words);
    kent_text_add(&words, "designed: ");
    add_designed(row, &words);
    say(out, limit, "", &words);
    print_reaches(row, limit, out);
    if (b->worst >= 0) {
        const kent_built_reach *worst = &b->reaches[b->worst];
        kent_text_add(&words, "Factor reached %s, asked %s: %s in '%s'.",
                      kent_shown_number(worst->reached, 2).text,
                      kent_shown_number(worst->asked, 2).text, part_of(row, worst).text,
                      case_of(row, worst)->title.s);
        if (worst->utilisation > 1.0) {
            kent_text_add(&words, " That is %s of what is asked.",
                          kent_shown_number(worst->reached / worst->asked, 2).text);
        }
        say(out, limit, "", &words);
    }
    for (size_t i = 0; i < b->broken.count; i++) {
        kent_table_paragraph(out, limit, "-  ", b->broken.text[i]);
    }
done:
    out->failed = out->failed || words.failed;
    kent_text_clear(&words);
}

kent_status kent_report_built(const kent_results *r, const int *fittings, size_t count,
                              const kent_report_options *o, kent_sink sink)
{
    const size_t limit = o->wide ? 0 : KENT_TABLE_LIMIT;
    kent_text out = {0}, words = {0};
    size_t short_of = 0, stated = 0;
    kent_text_add(&out, "%s\nAs built\n", r->model->title);
    kent_imprint_top(r->model, limit, &out);
    for (size_t i = 0; i < count; i++) {
        const built_row row = row_of(r, o->units, fittings[i]);
        print_fitting(&row, limit, &out);
        stated += row.given != NULL;
        short_of += row.given && row.built->falls_short;
    }
    kent_text_add(&words,
                  "%zu of %zu fittings stated as built; %zu of them with less than is "
                  "asked, or with something that could not be told.",
                  stated, count, short_of);
    kent_text_add(&out, "\n");
    say(&out, limit, "", &words);
    kent_table_paragraph(
        &out, limit, "",
        "* the part and load case that uses most. Reached: what ground or weight holds "
        "by "
        "the dimensions built, over the unfactored load. Nothing is interpolated, and "
        "what was not measured is not told.");
    kent_text_add(&out, "\n");
    kent_imprint_end(r->model, limit, &out);
    out.failed = out.failed || words.failed;
    const kent_status status = kent_sink_flush(sink, &out);
    kent_text_clear(&words);
    kent_text_clear(&out);
    return status;
}

/* ---- CSV ------------------------------------------------------------------------- */

static void add_number(kent_text *out, kent_kind kind, kent_system units, double si)
{
    const double value = kent_units_shown(kind, units, si);
    kent_text_add(out, ",");
    if (isfinite(value)) kent_text_add(out, "%.8g", value);
}

kent_status kent_report_built_csv(const kent_results *r, const int *fittings,
                                  size_t count, const kent_report_options *o,
                                  kent_sink sink)
{
    const char *force = kent_units_display(KENT_FORCE, o->units).unit;
    kent_text out = {0};
    kent_text_add(&out,
                  "fitting,part,load case,load [%s],holds [%s],factor reached,factor "
                  "asked,utilisation,governs\n",
                  force, force);
    for (size_t i = 0; i < count; i++) {
        const built_row row = row_of(r, o->units, fittings[i]);
        for (size_t k = 0; k < row.built->count; k++) {
            const kent_built_reach *reach = &row.built->reaches[k];
            kent_summary_field(&out, row.fitting->id);
            kent_text_add(&out, ",");
            kent_summary_field(&out, part_of(&row, reach).text);
            kent_text_add(&out, ",");
            kent_summary_field(&out, case_of(&row, reach)->title.s);
            add_number(&out, KENT_FORCE, o->units, reach->load);
            add_number(&out, KENT_FORCE, o->units, reach->resistance);
            add_number(&out, KENT_RATIO, o->units, reach->reached);
            add_number(&out, KENT_RATIO, o->units, reach->asked);
            add_number(&out, KENT_RATIO, o->units, reach->utilisation);
            kent_text_add(&out, ",%s\n", (int)k == row.built->worst ? "yes" : "no");
        }
    }
    const kent_status status = kent_sink_flush(sink, &out);
    kent_text_clear(&out);
    return status;
}
