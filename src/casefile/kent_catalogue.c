#include "kent_catalogue_internal.h"

#include <libgen.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

/* In this order: a table of pipes refers to materials. */
static const char *const FILES[] = {"materials.cfg", "pipes.cfg",     "valves.cfg",
                                    "soils.cfg",     "concretes.cfg", "rules.cfg"};

void *kent_catalogue_grown(kent_reader *r, void **array, size_t *count, size_t size)
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

/* ---- files ----------------------------------------------------------------------- */

static const struct {
    const char *list, *group;
    void (*add)(kent_reader *, kent_record *, kent_catalogue *);
} LISTS[] = {
    {"materials", "material", kent_catalogue_add_material},
    {"standards", "standard", kent_catalogue_add_standard},
    {"valves", "valve_type", kent_catalogue_add_valve},
    {"soils", "soil_row", kent_catalogue_add_soil},
    {"concretes", "concrete_row", kent_catalogue_add_concrete},
    {"rules", "rule", kent_catalogue_add_rules},
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
    for (size_t i = 0; i < c->concrete_count; i++) {
        kent_reader_shelve(r, KENT_SHELF_CONCRETES, c->concretes[i].id, (int)i,
                           nowhere);
    }
    for (size_t i = 0; i < c->rule_count; i++) {
        kent_reader_shelve(r, KENT_SHELF_RULES, c->rules[i].id, (int)i, nowhere);
    }
    kent_reader_close_shelf(r, KENT_SHELF_PIPE_CLASSES);
    kent_reader_close_shelf(r, KENT_SHELF_MATERIALS);
    kent_reader_close_shelf(r, KENT_SHELF_VALVE_TYPES);
    kent_reader_close_shelf(r, KENT_SHELF_SOIL_ROWS);
    kent_reader_close_shelf(r, KENT_SHELF_CONCRETES);
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
    free(c->concretes);
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
