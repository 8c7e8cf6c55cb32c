#include "kent_summary.h"

#include "kent_pressures.h"
#include "kent_shown.h"
#include "kent_sink.h"
#include "kent_table.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* One fitting with everything known of it. */
typedef struct kent_row {
    const kent_results *results;
    const kent_model *model;
    kent_system units;
    const kent_fitting *fitting;
    const kent_fitting_loads *loads;
    const kent_holding *holding;
    const kent_load_case *governing; /* NULL: none */
    const kent_instant *at;          /* NULL: none */
    kent_pressures pressures;
} kent_row;

static kent_row row_of(const kent_results *r, kent_system units, size_t fitting)
{
    kent_row row = {.results = r,
                    .model = r->model,
                    .units = units,
                    .fitting = &r->model->fittings[fitting],
                    .loads = &r->loads->fittings[fitting],
                    .holding = &r->restraints->fittings[fitting],
                    .pressures = kent_pressures_of(r, fitting)};
    row.at = kent_shown_instant(row.loads, row.holding);
    if (row.at) row.governing = &row.loads->cases[row.holding->governing];
    return row;
}

/* ---- columns of numbers: SI ------------------------------------------------------ */

static double station(const kent_row *r) { return r->fitting->station; }
static double angle(const kent_row *r) { return r->fitting->angle; }
static double size(const kent_row *r) { return r->fitting->size; }
static double branch(const kent_row *r) { return r->fitting->branch_size; }
static double time_at(const kent_row *r) { return r->at ? r->at->time : NAN; }
static double pressure(const kent_row *r) { return r->at ? r->at->pressure : NAN; }
static double design(const kent_row *r) { return r->holding->design_thrust; }
static double asked(const kent_row *r) { return r->holding->factor_asked; }
static double reached(const kent_row *r) { return r->holding->factor_reached; }
static double used(const kent_row *r) { return r->holding->utilisation; }
static double runner_up(const kent_row *r) { return r->holding->runner_up_load; }
static double joints(const kent_row *r) { return r->holding->restrained_length; }
static double curve_radius(const kent_row *r) { return r->fitting->curve_radius; }
static double curve_length(const kent_row *r) { return r->fitting->curve_length; }
static double cover(const kent_row *r) { return r->fitting->cover; }
static double rating(const kent_row *r)
{
    return r->pressures.rating[KENT_RATING_SERVICE];
}

static double surge_rating(const kent_row *r)
{
    return r->pressures.rating[KENT_RATING_SURGE];
}

static double test_rating(const kent_row *r)
{
    return r->pressures.rating[KENT_RATING_TEST];
}

static kent_vec3 thrust(const kent_row *r)
{
    return r->at ? r->at->balance.thrust : (kent_vec3){NAN, NAN, NAN};
}

static double thrust_x(const kent_row *r) { return thrust(r).x; }
static double thrust_y(const kent_row *r) { return thrust(r).y; }
static double thrust_z(const kent_row *r) { return thrust(r).z; }
static double whole(const kent_row *r) { return kent_vec3_length(thrust(r)); }
static double across(const kent_row *r)
{
    return r->at ? kent_thrust_horizontal(thrust(r)) : NAN;
}

static double azimuth(const kent_row *r)
{
    const kent_fitting *f = r->fitting;
    const bool schematic = f->point >= 0 && isnan(r->model->points[f->point].at.x);
    if (!r->at || schematic || across(r) <= 0.0) return NAN;
    return kent_thrust_azimuth(thrust(r));
}

static double highest_seal(const kent_row *r)
{
    double most = NAN;
    for (size_t i = 0; i < r->fitting->port_count; i++) {
        most = fmax(most, r->model->ports[r->fitting->port_first + i].seal_diameter);
    }
    return most;
}

static double of_block(const kent_row *r, double value)
{
    return r->holding->held && r->holding->block.type != KENT_BLOCK_NONE ? value : NAN;
}

static double block_width(const kent_row *r)
{
    return of_block(r, r->holding->block.width);
}
static double block_height(const kent_row *r)
{
    return of_block(r, r->holding->block.height);
}
static double block_thickness(const kent_row *r)
{
    return of_block(r, r->holding->block.thickness);
}
static double block_volume(const kent_row *r)
{
    return of_block(r, r->holding->block.volume);
}
static double block_area(const kent_row *r)
{
    return of_block(r, r->holding->block.bearing_area);
}
static double block_bearing(const kent_row *r)
{
    return of_block(r, r->holding->block.bearing_pressure);
}

static double of_face(const kent_row *r, double value)
{
    return r->holding->block.has_face ? of_block(r, value) : NAN;
}

static double face_width(const kent_row *r)
{
    return of_face(r, r->holding->block.face.width);
}
static double face_height(const kent_row *r)
{
    return of_face(r, r->holding->block.face.height);
}
static double face_thickness(const kent_row *r)
{
    return of_face(r, r->holding->block.face_thickness);
}
static double face_volume(const kent_row *r)
{
    return of_face(r, r->holding->block.face_volume);
}

static double steady(const kent_row *r)
{
    return r->pressures.at[KENT_PRESSURE_STEADY];
}
static double static_of(const kent_row *r)
{
    return r->pressures.at[KENT_PRESSURE_STATIC];
}
static double test(const kent_row *r) { return r->pressures.at[KENT_PRESSURE_TEST]; }
static double highest(const kent_row *r)
{
    return r->pressures.at[KENT_PRESSURE_HIGHEST];
}
static double lowest(const kent_row *r)
{
    return r->pressures.at[KENT_PRESSURE_LOWEST];
}

/* ---- columns of words ------------------------------------------------------------ */

static void point(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s", r->fitting->id);
}

static void type(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s", kent_fitting_type_word(r->fitting->type));
}

static void orientation(const kent_row *r, kent_text *out)
{
    if (r->fitting->type != KENT_BEND) return;
    kent_text_add(out, "%s", kent_orientation_word(r->fitting->orientation));
}

/* Of the drawings: its own, else the project's. */
static void sheet(const kent_row *r, kent_text *out)
{
    const char *own = r->fitting->stated.sheet;
    kent_text_add(out, "%s", own[0] != '\0' ? own : r->model->project.drawing);
}

static void role(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s", kent_role_word(r->fitting->role));
}

/* How a branch without a pipe ends. */
static void branch_end(const kent_row *r, kent_text *out)
{
    const kent_branch_end end = r->fitting->branch.end;
    if (end != KENT_BRANCH_NONE) kent_text_add(out, "%s", kent_branch_end_word(end));
}

/* Points whose fittings are told as this one. */
static void members(const kent_row *r, kent_text *out)
{
    for (size_t i = 0; i < r->fitting->member_count; i++) {
        const int point = r->model->members[r->fitting->member_first + i];
        kent_text_add(out, "%s%s", i > 0 ? "; " : "", r->model->points[point].id);
    }
}

static void soil(const kent_row *r, kent_text *out)
{
    if (r->fitting->soil < 0) return;
    kent_text_add(out, "%s", r->model->soils[r->fitting->soil].id);
}

static void load_case(const kent_row *r, kent_text *out)
{
    if (r->governing) kent_text_add(out, "%s", r->governing->title.s);
}

static void sense(const kent_row *r, kent_text *out)
{
    if (r->governing) kent_text_add(out, "%s", kent_shown_sense(r->holding->sense));
}

static void march_name(const kent_model *m, kent_march march, kent_text *out)
{
    if (march.scenario < 0) return;
    const char *id = m->scenarios[march.scenario].id;
    kent_text_add(out, "%s", kent_name_in_state(m, id, march.state).s);
}

static void result_name(const kent_results *r, int index, kent_text *out)
{
    if (index < 0) return;
    const kent_scenario_result *s = &r->scenarios[index];
    march_name(r->model, (kent_march){s->scenario, s->state}, out);
}

static void scenario(const kent_row *r, kent_text *out)
{
    const kent_load_case *c = r->governing;
    if (c) march_name(r->results->model, (kent_march){c->scenario, c->state}, out);
}

static void highest_in(const kent_row *r, kent_text *out)
{
    result_name(r->results, r->pressures.highest_in, out);
}

static void lowest_in(const kent_row *r, kent_text *out)
{
    result_name(r->results, r->pressures.lowest_in, out);
}

static void pushes(const kent_row *r, kent_text *out)
{
    if (!r->at) return;
    kent_text_add(
        out, "%s",
        kent_shown_push(r->model, r->fitting, thrust(r), r->units, KENT_ROOMY).text);
}

static void restraint(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s", kent_restraint_word(r->holding->chosen));
}

static void block_type(const kent_row *r, kent_text *out)
{
    const bool block = r->holding->held && r->holding->block.type != KENT_BLOCK_NONE;
    kent_text_add(out, "%s",
                  kent_block_word(block ? r->holding->block.type : KENT_BLOCK_NONE));
}

static void held(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s",
                  r->holding->needs_nothing ? "not needed"
                  : r->holding->held        ? "yes"
                                            : "no");
}

static void runner_up_case(const kent_row *r, kent_text *out)
{
    const int i = r->holding->runner_up;
    if (i < 0 || (size_t)i >= r->loads->count) return;
    kent_text_add(out, "%s", r->loads->cases[i].title.s);
}

/* What the pressure acts on at each port, in port order. */
static void seals(const kent_row *r, kent_text *out)
{
    for (size_t i = 0; i < r->fitting->port_count; i++) {
        const kent_port *port = &r->model->ports[r->fitting->port_first + i];
        kent_text_add(out, "%s%.6g", i > 0 ? "; " : "",
                      kent_units_shown(KENT_DIAMETER, r->units, port->seal_diameter));
    }
}

static void cautions(const kent_row *r, kent_text *out)
{
    for (size_t i = 0; i < r->holding->cautions.count; i++) {
        kent_text_add(out, "%s%s", i > 0 ? "; " : "", r->holding->cautions.text[i]);
    }
}

/* ---- the list -------------------------------------------------------------------- */

enum {
    NARROW = 1, /* the narrow table shows it already */
    UNITED = 2  /* words, but with the unit of `kind` in the heading */
};

typedef struct kent_summary_column {
    const char *head;
    double (*number)(const kent_row *row); /* SI; NULL: words */
    void (*words)(const kent_row *row, kent_text *out);
    kent_kind kind;
    unsigned flags;
} kent_summary_column;

static const kent_summary_column COLUMNS[] = {
    {"station", station, NULL, KENT_LENGTH, NARROW},
    {"point", NULL, point, KENT_RATIO, 0},
    {"fitting", NULL, type, KENT_RATIO, NARROW},
    {"angle", angle, NULL, KENT_ANGLE, NARROW},
    {"orientation", NULL, orientation, KENT_RATIO, NARROW},
    {"bore", size, NULL, KENT_DIAMETER, NARROW},
    {"other bore", branch, NULL, KENT_DIAMETER, NARROW},
    {"load case", NULL, load_case, KENT_RATIO, NARROW},
    {"scenario", NULL, scenario, KENT_RATIO, NARROW},
    {"time", time_at, NULL, KENT_TIME, NARROW},
    {"pressure", pressure, NULL, KENT_PRESSURE, NARROW},
    {"thrust", whole, NULL, KENT_FORCE, NARROW},
    {"pushes", NULL, pushes, KENT_RATIO, NARROW},
    {"restraint", NULL, restraint, KENT_RATIO, NARROW},
    {"held", NULL, held, KENT_RATIO, NARROW},
    {"block", NULL, block_type, KENT_RATIO, NARROW},
    {"width", block_width, NULL, KENT_LENGTH, NARROW},
    {"height", block_height, NULL, KENT_LENGTH, NARROW},
    {"thickness", block_thickness, NULL, KENT_LENGTH, NARROW},
    {"volume", block_volume, NULL, KENT_VOLUME, NARROW},
    {"factor reached", reached, NULL, KENT_RATIO, NARROW},
    {"load over resistance", used, NULL, KENT_RATIO, NARROW},
    {"factor asked", asked, NULL, KENT_RATIO, 0},
    {"sense", NULL, sense, KENT_RATIO, 0},
    {"factored thrust", design, NULL, KENT_FORCE, 0},
    {"thrust east", thrust_x, NULL, KENT_FORCE, 0},
    {"thrust north", thrust_y, NULL, KENT_FORCE, 0},
    {"thrust up", thrust_z, NULL, KENT_FORCE, 0},
    {"horizontal", across, NULL, KENT_FORCE, 0},
    {"azimuth", azimuth, NULL, KENT_ANGLE, 0},
    {"largest seal diameter", highest_seal, NULL, KENT_DIAMETER, 0},
    {"seal diameters", NULL, seals, KENT_DIAMETER, UNITED},
    {"steady pressure", steady, NULL, KENT_PRESSURE, NARROW},
    {"static pressure", static_of, NULL, KENT_PRESSURE, NARROW},
    {"test pressure", test, NULL, KENT_PRESSURE, NARROW},
    {"highest pressure", highest, NULL, KENT_PRESSURE, NARROW},
    {"highest in", NULL, highest_in, KENT_RATIO, 0},
    {"lowest pressure", lowest, NULL, KENT_PRESSURE, NARROW},
    {"lowest in", NULL, lowest_in, KENT_RATIO, 0},
    {"rating", rating, NULL, KENT_PRESSURE, NARROW},
    {"rating with surge", surge_rating, NULL, KENT_PRESSURE, 0},
    {"rating under test", test_rating, NULL, KENT_PRESSURE, 0},
    {"runner-up", NULL, runner_up_case, KENT_RATIO, 0},
    {"runner-up factored thrust", runner_up, NULL, KENT_FORCE, 0},
    {"soil", NULL, soil, KENT_RATIO, 0},
    {"cover", cover, NULL, KENT_LENGTH, 0},
    {"area asked for", block_area, NULL, KENT_AREA, 0},
    {"bearing pressure", block_bearing, NULL, KENT_STRESS, 0},
    {"face width", face_width, NULL, KENT_LENGTH, 0},
    {"face height", face_height, NULL, KENT_LENGTH, 0},
    {"face thickness", face_thickness, NULL, KENT_LENGTH, 0},
    {"face volume", face_volume, NULL, KENT_VOLUME, 0},
    {"restrained length", joints, NULL, KENT_LENGTH, 0},
    {"cautions", NULL, cautions, KENT_RATIO, NARROW},
    {"sheet", NULL, sheet, KENT_RATIO, 0},
    {"role", NULL, role, KENT_RATIO, 0},
    {"branch end", NULL, branch_end, KENT_RATIO, 0},
    {"members", NULL, members, KENT_RATIO, 0},
    {"curve radius", curve_radius, NULL, KENT_LENGTH, 0},
    {"curve length", curve_length, NULL, KENT_LENGTH, 0},
};
enum { COLUMN_COUNT = sizeof COLUMNS / sizeof COLUMNS[0] };

static bool has_unit(const kent_summary_column *c, kent_system units)
{
    return (c->number || (c->flags & UNITED)) &&
           kent_units_display(c->kind, units).unit[0] != '\0';
}

/* ---- as CSV ---------------------------------------------------------------------- */

void kent_summary_field(kent_text *out, const char *text)
{
    if (!strpbrk(text, ",\"\r\n")) {
        kent_text_add(out, "%s", text);
        return;
    }
    kent_text_add(out, "\"");
    for (const char *s = text; *s != '\0'; s++) {
        kent_text_add(out, *s == '"' ? "\"\"" : "%c", *s);
    }
    kent_text_add(out, "\"");
}

static void add_heading(const kent_summary_column *c, kent_system units, kent_text *out)
{
    kent_text_add(out, "%s", c->head);
    if (has_unit(c, units)) {
        kent_text_add(out, " [%s]", kent_units_display(c->kind, units).unit);
    }
}

static void add_field(const kent_row *row, const kent_summary_column *c,
                      kent_text *words, kent_text *out)
{
    if (!c->number) {
        kent_text_reset(words);
        c->words(row, words);
        kent_summary_field(out, kent_text_of(words));
        return;
    }
    const double value = kent_units_shown(c->kind, row->units, c->number(row));
    if (isfinite(value)) kent_text_add(out, "%.8g", value);
}

kent_status kent_report_summary_csv(const kent_results *r, const kent_report_options *o,
                                    kent_sink sink)
{
    kent_text out = {0}, words = {0};
    kent_listing listing;
    kent_status status = kent_listing_make(r, o, false, &listing);
    for (size_t c = 0; c < COLUMN_COUNT; c++) {
        if (c > 0) kent_text_add(&out, ",");
        add_heading(&COLUMNS[c], o->units, &out);
    }
    kent_text_add(&out, "\n");
    for (size_t i = 0; !status && i < listing.count; i++) {
        const kent_row row = row_of(r, o->units, listing.fitting[i]);
        for (size_t c = 0; c < COLUMN_COUNT; c++) {
            if (c > 0) kent_text_add(&out, ",");
            add_field(&row, &COLUMNS[c], &words, &out);
        }
        kent_text_add(&out, "\n");
        status = words.failed ? KENT_E_NOMEM : kent_sink_flush(sink, &out);
    }
    if (!status) status = kent_sink_flush(sink, &out);
    kent_listing_clear(&listing);
    kent_text_clear(&words);
    kent_text_clear(&out);
    return status;
}

/* ---- as the last table of --wide ------------------------------------------------- */

static void add_cell(const kent_row *row, const kent_summary_column *c,
                     kent_text *words, kent_table *t)
{
    if (c->number) {
        kent_table_cell(t, "%s",
                        kent_shown_quantity(c->kind, row->units, c->number(row)).text);
        return;
    }
    kent_text_reset(words);
    c->words(row, words);
    const char *said = kent_text_of(words);
    kent_table_cell(t, "%s", said[0] != '\0' ? said : KENT_SHOWN_NONE);
}

void kent_summary_table(const kent_results *r, const kent_report_options *o,
                        const kent_listing *listing, kent_text *out)
{
    const kent_summary_column *chosen[COLUMN_COUNT];
    kent_column columns[COLUMN_COUNT];
    kent_shown units[COLUMN_COUNT];
    size_t count = 0;
    kent_text words = {0};
    for (size_t c = 0; c < COLUMN_COUNT; c++) {
        if (COLUMNS[c].flags & NARROW) continue;
        const bool unit = has_unit(&COLUMNS[c], o->units);
        if (unit) units[count] = kent_shown_unit(COLUMNS[c].kind, o->units);
        columns[count] = (kent_column){.head = COLUMNS[c].head,
                                       .unit = unit ? units[count].text : "",
                                       .align = COLUMNS[c].number ? KENT_ALIGN_RIGHT
                                                                  : KENT_ALIGN_LEFT};
        chosen[count++] = &COLUMNS[c];
    }
    kent_table t = {.columns = columns, .column_count = count};
    for (size_t i = 0; i < listing->count; i++) {
        const kent_row row = row_of(r, o->units, listing->fitting[i]);
        for (size_t c = 0; c < count; c++) {
            add_cell(&row, chosen[c], &words, &t);
        }
    }
    (void)kent_table_print(&t, 0, out);
    out->failed = out->failed || words.failed;
    kent_table_clear(&t);
    kent_text_clear(&words);
}
