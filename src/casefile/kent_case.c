#include "kent_case_internal.h"

#include <assert.h>
#include <math.h>
#include <stddef.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* ---- what was assumed ------------------------------------------------------------ */

void kent_fill_assume(kent_filling *f, const char *what, const char *value,
                      const char *why)
{
    kent_notes_add(&f->model->assumed, "%s\t%s\t%s", what, value, why);
}

void kent_fill_assume_value(kent_filling *f, const char *what, double si,
                            kent_kind kind, const char *why)
{
    char value[64];
    const kent_display d = kent_units_display(kind, f->model->units);
    (void)snprintf(value, sizeof value, "%.5g%s%s",
                   kent_units_shown(kind, f->model->units, si), d.unit[0] ? " " : "",
                   d.unit);
    kent_fill_assume(f, what, value, why);
}

/* ---- groups that stand once ------------------------------------------------------ */

/* Reads the group under a key of the case; without one the record is empty. Returns
 * whether it was there. */
static bool read_group(kent_filling *f, const kent_record *parent, const char *key,
                       kent_record *out)
{
    const kent_twig *twig = kent_record_field(parent, key)->twig;
    if (!twig) {
        *out = (kent_record){0};
        return false;
    }
    kent_record_read(&f->reader, twig, key, parent->label, 0, out);
    return true;
}

static double given(const kent_record *record, bool there, const char *key,
                    double other)
{
    return there ? kent_record_number_or(record, key, other) : other;
}

static void fill_head(kent_filling *f, const char *path)
{
    kent_model *m = f->model;
    kent_record project;
    const char *slash = strrchr(path, '/');
    char name[160];
    (void)snprintf(name, sizeof name, "%s",
                   strcmp(path, "-") == 0 ? "standard input"
                   : slash                ? slash + 1
                                          : path);
    const size_t length = strlen(name);
    if (length > 4 && strcmp(name + length - 4, ".cfg") == 0) name[length - 4] = '\0';

    kent_record_copy(&f->root, "title", name, m->title, sizeof m->title);
    m->units = f->shown ? *f->shown : f->reader.system;
    if (!read_group(f, &f->root, "project", &project)) return;
    kent_project *p = &m->project;
    kent_record_copy(&project, "number", NULL, p->number, sizeof p->number);
    kent_record_copy(&project, "drawing", NULL, p->drawing, sizeof p->drawing);
    kent_record_copy(&project, "revision", NULL, p->revision, sizeof p->revision);
    kent_record_copy(&project, "designer", NULL, p->designer, sizeof p->designer);
    kent_record_copy(&project, "checker", NULL, p->checker, sizeof p->checker);
}

static void fill_water(kent_filling *f)
{
    static const double USUAL = 288.15; /* K, 15 degC */
    kent_record r;
    const bool there = read_group(f, &f->root, "water", &r);
    const bool warm = there && kent_record_has(&r, "temperature");
    const bool all = there && kent_record_has(&r, "density") &&
                     kent_record_has(&r, "bulk_modulus") &&
                     kent_record_has(&r, "viscosity") &&
                     kent_record_has(&r, "vapour_pressure");
    kent_water water = kent_water_at(given(&r, there, "temperature", USUAL));
    if (!warm && !all) {
        kent_fill_assume_value(f, "water temperature", USUAL, KENT_TEMPERATURE,
                               "no temperature given");
    }
    water.density = given(&r, there, "density", water.density);
    water.bulk_modulus = given(&r, there, "bulk_modulus", water.bulk_modulus);
    water.viscosity = given(&r, there, "viscosity", water.viscosity);
    water.vapour_pressure = given(&r, there, "vapour_pressure", water.vapour_pressure);
    water.sound_speed = sqrt(water.bulk_modulus / water.density);
    f->model->water = water;
}

static void fill_site(kent_filling *f)
{
    kent_record r;
    const bool there = read_group(f, &f->root, "site", &r);
    kent_model *m = f->model;
    m->barometric = kent_barometric_pressure(given(&r, there, "altitude", 0.0));
    m->gravity = given(&r, there, "gravity", m->gravity);
    if (there && kent_record_has(&r, "station_style")) {
        const int style = kent_record_field(&r, "station_style")->index;
        if (style >= 0) f->reader.station_style = (kent_station_style)style;
    }
    /* Only the vapour limit of a surge knows the weather. */
    if (kent_record_has(&f->root, "pipes") &&
        !(there && kent_record_has(&r, "altitude"))) {
        kent_fill_assume_value(f, "barometric pressure", m->barometric, KENT_PRESSURE,
                               "no altitude given: sea level");
    }
}

static void fill_ground(kent_filling *f)
{
    kent_record r;
    const bool there = read_group(f, &f->root, "ground", &r);
    kent_ground *g = &f->model->ground;
    if (there) {
        g->soil = kent_fill_soil_index(f, &r, "soil");
        g->cover = kent_record_number(&r, "cover");
        g->wrapped = kent_record_switch(&r, "wrapped", false);
    }
    if (there && kent_record_has(&r, "water_table")) {
        g->water_table = kent_record_number(&r, "water_table");
    } else {
        kent_fill_assume(f, "ground water", "none",
                         "no water_table given for the ground");
    }
}

/* In the order of kent_case_kind. */
static const char *const FACTORS[] = {"test",        "static",    "steady",
                                      "shut_off",    "recurring", "occasional",
                                      "exceptional", "suction"};

static void fill_loads(kent_filling *f)
{
    kent_record r;
    kent_record factors;
    kent_loads *l = &f->model->loads;
    const bool there = read_group(f, &f->root, "loads", &r);
    const double all = given(&r, there, "safety_factor", (double)NAN);
    const bool each = there && read_group(f, &r, "factors", &factors);

    static_assert(sizeof FACTORS / sizeof FACTORS[0] ==
                      sizeof l->factor / sizeof l->factor[0],
                  "one name for each kind of load case");
    for (size_t i = 0; i < sizeof FACTORS / sizeof FACTORS[0]; i++) {
        l->factor[i] = each ? kent_record_number_or(&factors, FACTORS[i], all) : all;
    }
    if (isnan(all)) {
        kent_fill_assume_value(f, "safety factor", f->model->rules.safety_factor,
                               KENT_RATIO, "not given in loads: the design rules'");
    }
    if (!there) return;
    l->place = r.place;
    l->test_pressure = kent_record_number(&r, "test_pressure");
    l->test_gauge = kent_record_field(&r, "test_gauge_at")->index;
    l->static_level = kent_record_number(&r, "static_level");
    const bool network = f->model->pipe_count > 0;
    if (r.sound && kent_record_has(&r, "test_pressure") && l->test_gauge < 0 &&
        network) {
        kent_record_complain(&f->reader, &r, "test_pressure",
                             "test_pressure needs test_gauge_at, the point where it is "
                             "read");
    }
    if (r.sound && !kent_record_has(&r, "test_pressure") && l->test_gauge >= 0) {
        kent_record_complain(
            &f->reader, &r, "test_gauge_at",
            "test_gauge_at needs test_pressure, the pressure read there");
    }
}

static void fill_solver(kent_filling *f)
{
    kent_record r;
    kent_solver *s = &f->model->solver;
    if (!read_group(f, &f->root, "solver", &r)) return;
    if (kent_record_has(&r, "friction")) {
        s->friction = (kent_surge_friction)kent_record_field(&r, "friction")->index;
    }
    s->grid_check = kent_record_switch(&r, "grid_check", s->grid_check);
    s->wave_speed_tolerance =
        kent_record_number_or(&r, "wave_speed_tolerance", s->wave_speed_tolerance);
    s->time_step = kent_record_number(&r, "time_step");
    if (kent_record_has(&r, "time_step")) {
        s->place =
            kent_tree_place(f->reader.tree, kent_record_field(&r, "time_step")->twig);
    }
    const double reaches = kent_record_number_or(&r, "min_reaches", s->min_reaches);
    const double rows = kent_record_number_or(&r, "history_rows", s->history_rows);
    if (!r.sound) return;
    s->min_reaches = (int)reaches;
    s->history_rows = (int)rows;
}

static void fill_rules(kent_filling *f)
{
    static const char *const USUAL[] = {
        [KENT_SI] = "common-practice", [KENT_US] = "common-practice-US"};
    const char *usual = USUAL[f->reader.system]; /* the case's, however it is shown */
    kent_record r;
    const bool there = read_group(f, &f->root, "design_rules", &r);
    int set = there ? kent_record_field(&r, "set")->index : -1;
    if (set < 0) {
        set = kent_directory_find(&f->reader.shelves[KENT_SHELF_RULES], usual);
        kent_fill_assume(f, "design rules", usual, "no set of rules named");
    }
    if (set < 0 || (size_t)set >= f->catalogue->rule_count) {
        kent_complain(
            f->reader.complaints, kent_tree_file(f->reader.tree, 0), 1,
            "the catalogue has no set of rules \"%s\"; name one in design_rules",
            usual);
        return;
    }
    kent_rules *rules = &f->model->rules;
    *rules = f->catalogue->rules[set];
    if (!there) return;
    kent_record_rules(&r, rules);
    for (size_t i = 0; i < r.count; i++) {
        const char *key = r.keys[i].key;
        if (!r.fields[i].twig || strcmp(key, "set") == 0) continue;
        kent_notes_add(&f->model->cautions,
                       "design rule %s is the case's own, not that of \"%s\"", key,
                       rules->id);
    }
    if (r.sound && rules->width_to_height[0] > rules->width_to_height[1]) {
        kent_record_complain(&f->reader, &r, NULL,
                             "width_to_height_least is above width_to_height_most");
    }
}

/* ---- lists ----------------------------------------------------------------------- */

enum { NO_SHELF = -1 };

/* In this order: what a list refers to stands before it. */
static const struct {
    const char *list, *group;
    size_t size, array, count; /* of an element; offsets in kent_model */
    kent_fill_one *fill;
    int shelf;
    const char *name; /* key that names an element on the shelf */
} LISTS[] = {
#define LIST(list, group, type, array, count, fill, shelf, name)                       \
    {                                                                                  \
        list, group, sizeof(type), offsetof(kent_model, array),                        \
            offsetof(kent_model, count), fill, shelf, name                             \
    }
    LIST("soils", "soil", kent_soil, soils, soil_count, kent_fill_soil,
         KENT_SHELF_SOILS, "id"),
    LIST("points", "point", kent_point, points, point_count, kent_fill_point,
         KENT_SHELF_POINTS, "id"),
    LIST("pipes", "pipe", kent_pipe, pipes, pipe_count, kent_fill_pipe,
         KENT_SHELF_PIPES, "id"),
    LIST("fixed_levels", "fixed_level", kent_fixed_level, fixed_levels,
         fixed_level_count, kent_fill_fixed_level, NO_SHELF, NULL),
    LIST("outflows", "outflow", kent_outflow, outflows, outflow_count,
         kent_fill_outflow, KENT_SHELF_OUTFLOWS, "at"),
    LIST("valves", "valve", kent_valve, valves, valve_count, kent_fill_valve,
         KENT_SHELF_VALVES, "id"),
    LIST("scenarios", "scenario", kent_scenario, scenarios, scenario_count,
         kent_fill_scenario, KENT_SHELF_SCENARIOS, "id"),
    LIST("fittings", "fitting", kent_fitting_note, notes, note_count, kent_fill_fitting,
         KENT_SHELF_FITTINGS, NULL),
#undef LIST
};

static void fill_list(kent_filling *f, size_t which)
{
    kent_reader *r = &f->reader;
    const kent_twig *list = kent_record_field(&f->root, LISTS[which].list)->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    /* Soils of the catalogue that are named come after the case's own. */
    const size_t more =
        LISTS[which].shelf == KENT_SHELF_SOILS ? f->catalogue->soil_count : 0;
    void *array = kent_alloc(count + more, LISTS[which].size);
    if (!array) {
        r->failed = true;
        return;
    }
    memcpy((char *)f->model + LISTS[which].array, &array, sizeof array);
    memcpy((char *)f->model + LISTS[which].count, &count, sizeof count);
    for (size_t i = 0; i < count && !r->failed; i++) {
        kent_record record;
        const kent_twig *twig = kent_record_element(r, list, "", i);
        if (!twig) continue;
        kent_record_read(r, twig, LISTS[which].group, "", i + 1, &record);
        LISTS[which].fill(f, &record, i);
        if (LISTS[which].name) {
            kent_reader_shelve(r, (kent_shelf)LISTS[which].shelf,
                               kent_record_field(&record, LISTS[which].name)->text,
                               (int)i, record.place);
        }
    }
    if (LISTS[which].shelf != NO_SHELF) {
        kent_reader_close_shelf(r, (kent_shelf)LISTS[which].shelf);
    }
}

/* ---- all ------------------------------------------------------------------------- */

static kent_status copy_files(const kent_tree *tree, kent_model *m)
{
    const size_t count = kent_tree_file_count(tree);
    m->files = kent_alloc(count, sizeof *m->files);
    if (!m->files) return KENT_E_NOMEM;
    for (size_t i = 0; i < count; i++) {
        m->files[i] = kent_copy_text(kent_tree_file(tree, i));
        if (!m->files[i]) return KENT_E_NOMEM;
        m->file_count++;
    }
    m->checksum = kent_tree_checksum(tree);
    return KENT_OK;
}

static void fill_all(kent_filling *f, const char *path)
{
    kent_reader *r = &f->reader;
    kent_record_read(r, kent_tree_root(r->tree), "case", "", 0, &f->root);
    r->system = kent_record_field(&f->root, "units")->index == 1 ? KENT_US : KENT_SI;
    r->station_style = r->system == KENT_US ? KENT_100FT_FT : KENT_KM_M;
    fill_head(f, path);
    fill_water(f);
    fill_site(f);
    for (size_t i = 0; i < sizeof LISTS / sizeof LISTS[0] && !r->failed; i++) {
        fill_list(f, i);
    }
    if (r->failed) return;
    fill_rules(f);
    fill_ground(f);
    fill_loads(f);
    fill_solver(f);
    if (r->complaints->count == 0 && f->model->pipe_count == 0 &&
        f->model->note_count == 0) {
        kent_complain(
            r->complaints, kent_tree_file(r->tree, 0), 1,
            "the case has nothing to work on; it needs pipes, or fittings with "
            "ports");
    }
}

kent_status kent_case_read(const char *path, const kent_catalogue *catalogue,
                           const kent_system *shown, kent_model **out,
                           kent_complaints *complaints, kent_error *err)
{
    assert(path && catalogue && out && complaints && err);
    const size_t before = complaints->count;
    kent_tree *tree = NULL;
    kent_filling *f = kent_alloc(1, sizeof *f);
    kent_status status = f ? KENT_OK : kent_error_nomem(err);
    if (!f) goto done;

    f->catalogue = catalogue;
    f->shown = shown;
    f->reader.complaints = complaints;
    f->model = kent_model_new();
    if (!f->model) status = kent_error_nomem(err);
    if (!status) status = kent_tree_read(path, &tree, complaints, err);
    if (!status) status = kent_units_new(&f->reader.units, err);
    if (status) goto done;
    f->reader.tree = tree;
    status = copy_files(tree, f->model);
    if (!status) {
        kent_catalogue_shelve(catalogue, &f->reader);
        fill_all(f, path);
        if (f->reader.failed || f->model->assumed.failed || f->model->cautions.failed) {
            status = KENT_E_NOMEM;
        } else if (complaints->count > before) {
            status = KENT_E_INPUT;
        }
    }
    if (!status) status = kent_model_derive(f->model, complaints);
    if (status == KENT_E_NOMEM) (void)kent_error_nomem(err);
    if (!status) {
        *out = f->model;
        f->model = NULL;
    }
done:
    kent_complaints_sort(complaints);
    if (f) {
        kent_reader_clear(&f->reader);
        kent_units_free(f->reader.units);
        kent_model_free(f->model);
    }
    free(f);
    kent_tree_free(tree);
    return status;
}
