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

void kent_fill_show(const kent_filling *f, double si, kent_kind kind, char *out,
                    size_t size)
{
    const kent_display d = kent_units_display(kind, f->model->units);
    (void)snprintf(out, size, "%.5g%s%s", kent_units_shown(kind, f->model->units, si),
                   d.unit[0] ? " " : "", d.unit);
}

void kent_fill_assume_value(kent_filling *f, const char *what, double si,
                            kent_kind kind, const char *why)
{
    char value[64];
    kent_fill_show(f, si, kind, value, sizeof value);
    kent_fill_assume(f, what, value, why);
}

/* ---- reading ----------------------------------------------------------------------
 */

bool kent_fill_group(kent_filling *f, const kent_record *parent, const char *key,
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

/* ---- lists ----------------------------------------------------------------------- */

enum { NO_SHELF = -1, NO_DEVICE = -1 };

/* In this order: what a list refers to stands before it. */
static const struct {
    const char *list, *group;
    size_t size, array, count; /* of an element; offsets in kent_model */
    kent_fill_one *fill;
    const char *name; /* key that names an element on the shelf */
    int shelf;
    int device; /* kent_device_kind */
} LISTS[] = {
#define LIST(list, group, type, array, count, fill, shelf, name)                       \
    {                                                                                  \
        list, group, sizeof(type), offsetof(kent_model, array),                        \
            offsetof(kent_model, count), fill, name, shelf, NO_DEVICE                  \
    }
#define DEVICES(list, group, type, array, count, fill, kind)                           \
    {                                                                                  \
        list, group, sizeof(type), offsetof(kent_model, array),                        \
            offsetof(kent_model, count), fill, "id", KENT_SHELF_DEVICES, kind          \
    }
    LIST("soils", "soil", kent_soil, soils, soil_count, kent_fill_soil,
         KENT_SHELF_SOILS, "id"),
    LIST("points", "point", kent_point, points, point_count, kent_fill_point,
         KENT_SHELF_POINTS, "id"),
    LIST("pipes", "pipe", kent_pipe, pipes, pipe_count, kent_fill_pipe,
         KENT_SHELF_PIPES, "id"),
    LIST("fixed_levels", "fixed_level", kent_fixed_level, fixed_levels,
         fixed_level_count, kent_fill_fixed_level, KENT_SHELF_FIXED_LEVELS, "at"),
    LIST("outflows", "outflow", kent_outflow, outflows, outflow_count,
         kent_fill_outflow, KENT_SHELF_OUTFLOWS, "at"),
    LIST("valves", "valve", kent_valve, valves, valve_count, kent_fill_valve,
         KENT_SHELF_VALVES, "id"),
    DEVICES("pumps", "pump", kent_pump, pumps, pump_count, kent_fill_pump,
            KENT_DEVICE_PUMP),
    DEVICES("check_valves", "check_valve", kent_check_valve, check_valves,
            check_valve_count, kent_fill_check_valve, KENT_DEVICE_CHECK_VALVE),
    DEVICES("control_valves", "control_valve", kent_control_valve, control_valves,
            control_valve_count, kent_fill_control_valve, KENT_DEVICE_CONTROL_VALVE),
    DEVICES("surge_tanks", "surge_tank", kent_surge_tank, surge_tanks, surge_tank_count,
            kent_fill_surge_tank, KENT_DEVICE_SURGE_TANK),
    DEVICES("one_way_surge_tanks", "one_way_surge_tank", kent_one_way_tank,
            one_way_tanks, one_way_tank_count, kent_fill_one_way_tank,
            KENT_DEVICE_ONE_WAY_TANK),
    DEVICES("air_vessels", "air_vessel", kent_air_vessel, air_vessels, air_vessel_count,
            kent_fill_air_vessel, KENT_DEVICE_AIR_VESSEL),
    DEVICES("relief_valves", "relief_valve", kent_relief_valve, relief_valves,
            relief_valve_count, kent_fill_relief_valve, KENT_DEVICE_RELIEF_VALVE),
    DEVICES("air_valves", "air_valve", kent_air_valve, air_valves, air_valve_count,
            kent_fill_air_valve, KENT_DEVICE_AIR_VALVE),
    LIST("states", "state", kent_state, states, state_count, kent_fill_state,
         KENT_SHELF_STATES, "id"),
    LIST("scenarios", "scenario", kent_scenario, scenarios, scenario_count,
         kent_fill_scenario, KENT_SHELF_SCENARIOS, "id"),
    LIST("ground_zones", "ground_zone", kent_ground_zone, ground_zones,
         ground_zone_count, kent_fill_ground_zone, NO_SHELF, NULL),
    LIST("fittings", "fitting", kent_fitting_note, notes, note_count, kent_fill_fitting,
         KENT_SHELF_FITTINGS, NULL),
    LIST("as_built", "as_built", kent_built, built, built_count, kent_fill_built,
         NO_SHELF, NULL),
#undef LIST
#undef DEVICES
};

enum { LISTS_COUNT = sizeof LISTS / sizeof LISTS[0] };

/* The table whose rows come after a list, or NULL. */
static kent_rows *table_of(const kent_filling *f, size_t which)
{
    return LISTS[which].shelf == KENT_SHELF_POINTS  ? f->points_table
           : LISTS[which].shelf == KENT_SHELF_PIPES ? f->pipes_table
                                                    : NULL;
}

static void fill_one(kent_filling *f, size_t which, const kent_twig *twig,
                     size_t position, size_t index)
{
    kent_reader *r = &f->reader;
    kent_record record;
    kent_record_read(r, twig, LISTS[which].group, "", position, &record);
    LISTS[which].fill(f, &record, index);
    if (!LISTS[which].name || LISTS[which].shelf == KENT_SHELF_SCENARIOS) return;
    const int first = LISTS[which].device == NO_DEVICE
                          ? 0
                          : LISTS[which].device * KENT_DEVICES_OF_A_KIND;
    kent_reader_shelve(r, (kent_shelf)LISTS[which].shelf,
                       kent_record_field(&record, LISTS[which].name)->text,
                       first + (int)index, record.place);
}

/* Scenarios refer to each other: their names stand on the shelf before any is read. */
static void shelve_scenarios(kent_filling *f, const kent_twig *list)
{
    kent_reader *r = &f->reader;
    const size_t count = list ? kent_twig_count(list) : 0;
    for (size_t i = 0; i < count; i++) {
        const kent_twig *one = kent_twig_child(list, i);
        const kent_twig *id = kent_twig_member(one, "id");
        kent_reader_shelve(r, KENT_SHELF_SCENARIOS, id ? kent_twig_text(id) : NULL,
                           (int)i, kent_tree_place(r->tree, one));
    }
    kent_reader_close_shelf(r, KENT_SHELF_SCENARIOS);
}

/* Once the last list that stands on it is read. */
static void close_shelf(kent_reader *r, size_t which)
{
    const int shelf = LISTS[which].shelf;
    const bool last = which + 1 == LISTS_COUNT || LISTS[which + 1].shelf != shelf;
    if (shelf == NO_SHELF || shelf == KENT_SHELF_SCENARIOS || !last) return;
    kent_reader_close_shelf(r, (kent_shelf)shelf);
    if (shelf == KENT_SHELF_DEVICES) kent_reader_close_shelf(r, KENT_SHELF_PUMPS);
}

static void fill_list(kent_filling *f, size_t which)
{
    kent_reader *r = &f->reader;
    const kent_twig *list = kent_record_field(&f->root, LISTS[which].list)->twig;
    kent_rows *rows = table_of(f, which);
    const size_t listed = list ? kent_twig_count(list) : 0;
    const size_t count = listed + kent_rows_count(rows);
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
    if (LISTS[which].shelf == KENT_SHELF_SCENARIOS) shelve_scenarios(f, list);
    for (size_t i = 0; i < listed && !r->failed; i++) {
        const kent_twig *twig = kent_record_element(r, list, "", i);
        if (twig) fill_one(f, which, twig, i + 1, i);
    }
    for (size_t i = listed; i < count && !r->failed; i++) {
        const kent_twig *twig = kent_rows_group(r, rows, i - listed);
        if (twig) {
            fill_one(f, which, twig, i - listed + 1, i);
        } else {
            r->failed = true;
        }
    }
    close_shelf(r, which);
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

static kent_status fill_all(kent_filling *f, const kent_twig *root, const char *path,
                            kent_error *err)
{
    const size_t before = f->reader.complaints->count;
    kent_reader *r = &f->reader;
    kent_record_read(r, root, "case", "", 0, &f->root);
    r->system = kent_record_field(&f->root, "units")->index == 1 ? KENT_US : KENT_SI;
    r->station_style = r->system == KENT_US ? KENT_100FT_FT : KENT_KM_M;
    kent_fill_head(f, path);
    kent_fill_water(f);
    kent_fill_site(f);
    kent_fill_solver(f); /* pipes ask it whether they creep */
    const kent_status status = kent_fill_tables(f, err);
    if (status != KENT_OK) return status; /* its rows are not to be had */
    for (size_t i = 0; i < LISTS_COUNT && !r->failed; i++) {
        fill_list(f, i);
    }
    if (r->failed) return KENT_E_NOMEM;
    kent_fill_rules(f);
    kent_fill_creep(f);
    kent_fill_ground(f);
    kent_fill_loads(f);
    kent_fill_limits(f);
    kent_fill_rules_check(f);
    kent_fill_concrete(f);
    kent_fill_concrete_check(f);
    if (r->complaints->count == 0 && f->model->pipe_count == 0 &&
        f->model->note_count == 0) {
        kent_complain(
            r->complaints, kent_tree_file(r->tree, 0), 1,
            "the case has nothing to work on; it needs pipes, or fittings with "
            "ports");
    }
    if (r->failed || f->model->assumed.failed || f->model->cautions.failed) {
        return KENT_E_NOMEM;
    }
    return r->complaints->count > before ? KENT_E_INPUT : copy_files(r->tree, f->model);
}

kent_status kent_fill_case(kent_filling *f, const kent_twig *root, const char *path,
                           kent_model **out, kent_error *err)
{
    f->model = kent_model_new();
    kent_status status = f->model ? KENT_OK : kent_error_nomem(err);
    if (!status) status = fill_all(f, root, path, err);
    if (!status) status = kent_model_derive(f->model, f->reader.complaints);
    if (!status) status = kent_fill_built_check(f);
    if (status == KENT_E_NOMEM) (void)kent_error_nomem(err);
    if (!status) {
        *out = f->model;
        f->model = NULL;
    }
    kent_rows_free(f->points_table);
    kent_rows_free(f->pipes_table);
    kent_model_free(f->model);
    f->points_table = f->pipes_table = NULL;
    f->model = NULL;
    return status;
}

kent_status kent_case_read(const char *path, const kent_catalogue *catalogue,
                           const kent_system *shown, kent_model **out,
                           kent_complaints *complaints, kent_error *err)
{
    assert(path && catalogue && out && complaints && err);
    kent_tree *tree = NULL;
    kent_filling *f = kent_alloc(1, sizeof *f);
    kent_status status = f ? KENT_OK : kent_error_nomem(err);
    if (!f) goto done;

    f->catalogue = catalogue;
    f->shown = shown;
    f->reader.complaints = complaints;
    status = kent_tree_read(path, &tree, complaints, err);
    if (!status) status = kent_units_new(&f->reader.units, err);
    if (status) goto done;
    f->reader.tree = tree;
    kent_catalogue_shelve(catalogue, &f->reader);
    status = kent_fill_case(f, kent_tree_root(tree), path, out, err);
done:
    kent_complaints_sort(complaints);
    if (f) {
        kent_reader_clear(&f->reader);
        kent_units_free(f->reader.units);
    }
    free(f);
    kent_tree_free(tree);
    return status;
}
