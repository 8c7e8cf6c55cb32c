#include "kent_catalogue_internal.h"

#include <libgen.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

/* In this order: a table of pipes refers to materials. */
static const char *const FILES[] = {"materials.cfg", "pipes.cfg", "valves.cfg",
                                    "soils.cfg", "rules.cfg"};

/* ---- values shared with cases ---------------------------------------------------- */

static void replace(const kent_record *record, const char *key, double *value)
{
    if (kent_record_has(record, key)) *value = kent_record_number(record, key);
}

void kent_record_soil(const kent_record *record, kent_soil *soil)
{
    replace(record, "allowable_bearing", &soil->allowable_bearing);
    replace(record, "factor_inside", &soil->factor_inside);
    replace(record, "vertical_bearing", &soil->vertical_bearing);
    replace(record, "unit_weight", &soil->unit_weight);
    replace(record, "friction_angle", &soil->friction_angle);
    replace(record, "cohesion", &soil->cohesion);
    replace(record, "friction_ratio", &soil->friction_ratio);
    replace(record, "adhesion_ratio", &soil->adhesion_ratio);
    replace(record, "passive_ratio", &soil->passive_ratio);
    soil->unreliable = kent_record_switch(record, "unreliable", soil->unreliable);
}

void kent_record_rules(const kent_record *record, kent_rules *rules)
{
    replace(record, "safety_factor", &rules->safety_factor);
    replace(record, "height_to_depth", &rules->height_to_depth);
    replace(record, "width_to_height_least", &rules->width_to_height[0]);
    replace(record, "width_to_height_most", &rules->width_to_height[1]);
    replace(record, "least_thickness", &rules->least_thickness);
    replace(record, "least_height", &rules->least_height);
    replace(record, "side_step", &rules->side_step);
    replace(record, "least_cover", &rules->least_cover);
    replace(record, "concrete_unit_weight", &rules->concrete_unit_weight);
    replace(record, "water_unit_weight", &rules->water_unit_weight);
    replace(record, "wrapped_ratio", &rules->wrapped_ratio);
    replace(record, "largest_volume", &rules->largest_volume);
}

size_t kent_record_pairs(kent_reader *r, kent_record *record, const char *key,
                         const kent_kind *first_kind, size_t most, double *a, double *b)
{
    const kent_twig *list = kent_record_field(record, key)->twig;
    const size_t count = kent_twig_count(list);
    if (count > most) {
        kent_record_complain(r, record, key, "%s has %zu pairs; at most %zu are read",
                             key, count, most);
        return 0;
    }
    for (size_t i = 0; i < count; i++) {
        const kent_twig *pair = kent_twig_child(list, i);
        if (kent_twig_type_of(pair) != KENT_TWIG_LIST || kent_twig_count(pair) != 2) {
            kent_record_complain(r, record, key,
                                 "element %zu of %s must be a pair, as ( %s, 0.5 )",
                                 i + 1, key, first_kind ? "\"0 s\"" : "1.0");
            return 0;
        }
        a[i] =
            kent_record_item(r, record, kent_twig_child(pair, 0), key,
                             first_kind != NULL, first_kind ? *first_kind : KENT_RATIO);
        b[i] = kent_record_item(r, record, kent_twig_child(pair, 1), key, false,
                                KENT_RATIO);
        if (isnan(a[i]) || isnan(b[i])) return 0;
    }
    return count;
}

bool kent_record_curve(kent_reader *r, kent_record *record, kent_valve_curve *out)
{
    double opening[KENT_VALVE_POINTS];
    double loss[KENT_VALVE_POINTS];
    const size_t count = kent_record_pairs(r, record, "characteristic", NULL,
                                           KENT_VALVE_POINTS, opening, loss);
    if (count > 0 && kent_valve_curve_from_loss(opening, loss, count, out)) return true;
    if (record->sound) {
        kent_record_complain(r, record, "characteristic",
                             "characteristic needs at least two pairs (opening, K), "
                             "openings different and within 0 to 1, K above 0");
    }
    return false;
}

/* ---- one row each ---------------------------------------------------------------- */

static kent_provenance provenance(const kent_record *record)
{
    kent_provenance from;
    kent_record_copy(record, "source", NULL, from.source, sizeof from.source);
    kent_record_copy(record, "status", NULL, from.status, sizeof from.status);
    return from;
}

/* "source (status)", for structs with one field for both. */
static void source_with_status(const kent_record *record, char *out, size_t size)
{
    const kent_provenance from = provenance(record);
    (void)snprintf(out, size, "%.160s (%s)", from.source, from.status);
}

static void *grown(kent_reader *r, void **array, size_t *count, size_t size)
{
    size_t capacity = 0; /* what kent_grow must have made for *count */
    while (capacity < *count) {
        capacity = capacity > 0 ? 2 * capacity : 8;
    }
    if (kent_grow(array, &capacity, *count + 1, size) != 0) {
        r->failed = true;
        return NULL;
    }
    return (char *)*array + size * (*count)++;
}

static void add_material(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    kent_material *m = grown(r, (void **)&c->materials, &c->material_count, sizeof *m);
    if (!m) return;
    *m = (kent_material){.modulus = kent_record_number(record, "elastic_modulus"),
                         .poisson = kent_record_number(record, "poisson_ratio"),
                         .density = kent_record_number(record, "density"),
                         .roughness = kent_record_number(record, "roughness"),
                         .lining_modulus =
                             kent_record_number_or(record, "lining_modulus", 0.0),
                         .from = provenance(record)};
    kent_record_copy(record, "id", NULL, m->id, sizeof m->id);
}

static void add_valve_type(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    kent_valve_type *v = grown(r, (void **)&c->valves, &c->valve_count, sizeof *v);
    if (!v) return;
    *v = (kent_valve_type){.loss = kent_record_number(record, "loss"),
                           .from = provenance(record)};
    kent_record_copy(record, "id", NULL, v->id, sizeof v->id);
    if (kent_record_has(record, "characteristic")) {
        (void)kent_record_curve(r, record, &v->curve);
    }
}

static void add_soil(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    kent_soil *s = grown(r, (void **)&c->soils, &c->soil_count, sizeof *s);
    if (!s) return;
    *s = kent_soil_blank();
    kent_record_copy(record, "id", NULL, s->id, sizeof s->id);
    kent_record_soil(record, s);
    source_with_status(record, s->source, sizeof s->source);
}

static void add_rules(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    kent_rules *rules = grown(r, (void **)&c->rules, &c->rule_count, sizeof *rules);
    if (!rules) return;
    *rules = (kent_rules){.factor_test = NAN};
    kent_record_copy(record, "id", NULL, rules->id, sizeof rules->id);
    kent_record_rules(record, rules);
    source_with_status(record, rules->source, sizeof rules->source);
}

/* ---- a standard: one pipe per row and class -------------------------------------- */

enum { CLASSES_MOST = 16 };

typedef struct standard {
    kent_pipe_class common; /* what all its pipes share */
    char id[KENT_ID], before[16], after[16];
    double unit;                    /* m */
    bool walls_are_minimum;         /* else nominal */
    double tolerance, per_size;     /* m; - (of the size in its unit) */
    char classes[CLASSES_MOST][16]; /* [class_count] */
    double ratings[CLASSES_MOST];   /* Pa; NAN */
    size_t class_count;
} standard;

static void read_classes(kent_reader *r, kent_record *record, standard *s)
{
    const kent_twig *list = kent_record_field(record, "classes")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    if (count > CLASSES_MOST) {
        kent_record_complain(r, record, "classes", "more than %d classes",
                             CLASSES_MOST);
        return;
    }
    for (size_t i = 0; i < count; i++) {
        kent_record column;
        const kent_twig *twig = kent_record_element(r, list, record->label, i);
        if (!twig) return;
        kent_record_read(r, twig, "pipe_column", record->label, i + 1, &column);
        kent_record_copy(&column, "id", NULL, s->classes[i], sizeof s->classes[i]);
        s->ratings[i] = kent_record_number(&column, "pressure_rating");
    }
    s->class_count = count;
}

/* false: its id would be cut short. */
static bool add_pipe(kent_reader *r, const standard *s, const double *row,
                     size_t column, kent_catalogue *c)
{
    const double size = row[0];
    const double wall = row[3 + column] * s->unit;
    kent_pipe_class *p = grown(r, (void **)&c->pipes, &c->pipe_count, sizeof *p);
    if (!p) return true; /* the reader knows */
    *p = s->common;
    const int length = snprintf(p->id, sizeof p->id, "%s-%s-%s%g%s", s->id,
                                s->classes[column], s->before, size, s->after);
    if (length >= (int)sizeof p->id) {
        c->pipe_count--;
        return false;
    }
    p->outside_diameter = row[1] * s->unit;
    p->lining = row[2] * s->unit;
    p->wall_minimum = s->walls_are_minimum ? wall : NAN;
    p->wall = s->walls_are_minimum ? wall + s->tolerance + s->per_size * size * s->unit
                                   : wall;
    p->pressure_rating = s->ratings[column];
    return true;
}

static void add_row(kent_reader *r, kent_record *record, const standard *s,
                    size_t index, kent_catalogue *c)
{
    const kent_twig *twig =
        kent_twig_child(kent_record_field(record, "rows")->twig, index);
    const size_t count = 3 + s->class_count;
    double row[3 + CLASSES_MOST] = {0};
    if (kent_twig_type_of(twig) != KENT_TWIG_LIST || kent_twig_count(twig) != count) {
        kent_record_complain(r, record, "rows", "row %zu must hold %zu numbers",
                             index + 1, count);
        return;
    }
    for (size_t i = 0; i < count; i++) {
        row[i] = kent_twig_number(kent_twig_child(twig, i));
        if (!(row[i] >= 0.0) || (i < 2 && row[i] == 0.0)) {
            kent_record_complain(r, record, "rows",
                                 "row %zu: number %zu is not positive", index + 1,
                                 i + 1);
            return;
        }
    }
    for (size_t i = 0; i < s->class_count; i++) {
        if (row[3 + i] > 0.0 && !add_pipe(r, s, row, i, c)) {
            kent_record_complain(r, record, "rows", "ids of row %zu are too long",
                                 index + 1);
            return;
        }
    }
}

static void add_standard(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    standard s = {.common.from = provenance(record)};
    kent_record_copy(record, "id", NULL, s.id, sizeof s.id);
    kent_record_copy(record, "before_size", NULL, s.before, sizeof s.before);
    kent_record_copy(record, "after_size", NULL, s.after, sizeof s.after);
    kent_record_copy(record, "standard", NULL, s.common.standard,
                     sizeof s.common.standard);
    kent_record_copy(record, "material", NULL, s.common.material,
                     sizeof s.common.material);
    s.unit = kent_record_field(record, "unit")->index == 0 ? 0.001 : 0.0254;
    s.walls_are_minimum = kent_record_field(record, "walls")->index == 0;
    s.tolerance = kent_record_number_or(record, "tolerance", 0.0);
    s.per_size = kent_record_number_or(record, "tolerance_per_size", 0.0);
    read_classes(r, record, &s);
    const kent_twig *rows = kent_record_field(record, "rows")->twig;
    if (!record->sound || !rows) return;
    for (size_t i = 0; i < kent_twig_count(rows); i++) {
        add_row(r, record, &s, i, c);
    }
}

/* ---- files ----------------------------------------------------------------------- */

static const struct {
    const char *list, *group;
    void (*add)(kent_reader *, kent_record *, kent_catalogue *);
} LISTS[] = {
    {"materials", "material", add_material},
    {"standards", "standard", add_standard},
    {"valves", "valve_type", add_valve_type},
    {"soils", "soil_row", add_soil},
    {"rules", "rule", add_rules},
};

static void read_lists(kent_reader *r, kent_catalogue *c)
{
    kent_record root;
    kent_record_read(r, kent_tree_root(r->tree), "catalogue", "", 0, &root);
    for (size_t k = 0; k < sizeof LISTS / sizeof LISTS[0]; k++) {
        const kent_twig *list = kent_record_field(&root, LISTS[k].list)->twig;
        const size_t count = list ? kent_twig_count(list) : 0;
        for (size_t i = 0; i < count; i++) {
            kent_record row;
            const kent_twig *twig = kent_record_element(r, list, "", i);
            if (!twig) continue;
            kent_record_read(r, twig, LISTS[k].group, "", i + 1, &row);
            if (row.sound) LISTS[k].add(r, &row, c);
        }
    }
}

void kent_catalogue_shelve(const kent_catalogue *c, kent_reader *r)
{
    const kent_place nowhere = {-1, 0};
    for (size_t i = 0; i < c->pipe_count; i++) {
        kent_reader_shelve(r, KENT_SHELF_PIPE_CLASSES, c->pipes[i].id, (int)i, nowhere);
    }
    for (size_t i = 0; i < c->material_count; i++) {
        kent_reader_shelve(r, KENT_SHELF_MATERIALS, c->materials[i].id, (int)i,
                           nowhere);
    }
    for (size_t i = 0; i < c->valve_count; i++) {
        kent_reader_shelve(r, KENT_SHELF_VALVE_TYPES, c->valves[i].id, (int)i, nowhere);
    }
    kent_reader_shelve(r, KENT_SHELF_VALVE_TYPES, "linear", (int)c->valve_count,
                       nowhere);
    for (size_t i = 0; i < c->soil_count; i++) {
        kent_reader_shelve(r, KENT_SHELF_SOIL_ROWS, c->soils[i].id, (int)i, nowhere);
    }
    for (size_t i = 0; i < c->rule_count; i++) {
        kent_reader_shelve(r, KENT_SHELF_RULES, c->rules[i].id, (int)i, nowhere);
    }
    kent_reader_close_shelf(r, KENT_SHELF_PIPE_CLASSES);
    kent_reader_close_shelf(r, KENT_SHELF_MATERIALS);
    kent_reader_close_shelf(r, KENT_SHELF_VALVE_TYPES);
    kent_reader_close_shelf(r, KENT_SHELF_SOIL_ROWS);
    kent_reader_close_shelf(r, KENT_SHELF_RULES);
}

/* Ids are unique within a kind, whatever file or table they come from. */
static void complain_of_twins(const kent_reader *r, const char *folder,
                              kent_complaints *complaints)
{
    for (int k = 0; k < KENT_SHELF_COUNT; k++) {
        const kent_directory *d = &r->shelves[k];
        for (size_t i = 1; i < d->count; i++) {
            if (strcmp(d->entries[i - 1].id, d->entries[i].id) != 0) continue;
            kent_complain(complaints, folder, 0, "\"%.60s\" is given twice",
                          d->entries[i].id);
        }
    }
}

static kent_status read_file(const char *folder, const char *name, kent_units *units,
                             kent_catalogue *c, kent_complaints *complaints,
                             kent_error *err)
{
    char path[1280];
    kent_tree *tree = NULL;
    kent_reader r = {.units = units, .complaints = complaints};
    (void)snprintf(path, sizeof path, "%s/%s", folder, name);

    kent_status status = kent_tree_read(path, &tree, complaints, err);
    if (status != KENT_OK) goto done;
    r.tree = tree;
    kent_catalogue_shelve(c, &r);
    read_lists(&r, c);
    if (r.failed) status = kent_error_nomem(err);
done:
    kent_reader_clear(&r);
    kent_tree_free(tree);
    return status;
}

/* Where config/ is, when nobody says. Sought from the running program, so that an
 * installed tree may be moved, and a program in its build folder never takes the
 * catalogue of another version. */
static const char *usual_folder(char *installed, size_t cap)
{
    const char *folder = getenv("KENTLEDGE_CONFIG");
    if (folder && folder[0] != '\0') return folder;

    char program[1024];
    const ssize_t length = readlink("/proc/self/exe", program, sizeof program - 1);
    if (length <= 0) return KENT_CONFIG_SOURCE_DIR;
    program[length] = '\0';
    (void)snprintf(installed, cap, "%s/%s", dirname(program), KENT_CONFIG_FROM_BIN);
    return access(installed, X_OK) == 0 ? installed : KENT_CONFIG_SOURCE_DIR;
}

kent_status kent_catalogue_read(const char *folder, kent_catalogue **out,
                                kent_complaints *complaints, kent_error *err)
{
    const size_t before = complaints->count;
    char installed[1200];
    kent_reader all = {.complaints = complaints};
    kent_units *units = NULL;
    kent_status status = KENT_OK;
    kent_catalogue *c = kent_alloc(1, sizeof *c);
    if (!c) return kent_error_nomem(err);
    if (!folder) folder = usual_folder(installed, sizeof installed);
    status = kent_units_new(&units, err);
    if (status != KENT_OK) goto done;

    for (size_t i = 0; i < sizeof FILES / sizeof FILES[0]; i++) {
        status = read_file(folder, FILES[i], units, c, complaints, err);
        if (status == KENT_E_IO || status == KENT_E_NOMEM) goto done;
    }
    kent_catalogue_shelve(c, &all);
    complain_of_twins(&all, folder, complaints);
    status = complaints->count > before ? KENT_E_INPUT : KENT_OK;
    if (all.failed) status = kent_error_nomem(err);
    kent_complaints_sort(complaints);
    if (status != KENT_OK) goto done;
    *out = c;
    c = NULL;
done:
    kent_reader_clear(&all);
    kent_units_free(units);
    kent_catalogue_free(c);
    return status;
}

void kent_catalogue_free(kent_catalogue *c)
{
    if (!c) return;
    free(c->pipes);
    free(c->materials);
    free(c->valves);
    free(c->soils);
    free(c->rules);
    free(c);
}

const kent_pipe_class *kent_catalogue_pipe(const kent_catalogue *c, const char *id)
{
    for (size_t i = 0; i < c->pipe_count; i++) {
        if (strcmp(c->pipes[i].id, id) == 0) return &c->pipes[i];
    }
    return NULL;
}

const kent_material *kent_catalogue_material(const kent_catalogue *c, const char *id)
{
    for (size_t i = 0; i < c->material_count; i++) {
        if (strcmp(c->materials[i].id, id) == 0) return &c->materials[i];
    }
    return NULL;
}

const kent_valve_type *kent_catalogue_valve(const kent_catalogue *c, const char *id)
{
    for (size_t i = 0; i < c->valve_count; i++) {
        if (strcmp(c->valves[i].id, id) == 0) return &c->valves[i];
    }
    return NULL;
}
