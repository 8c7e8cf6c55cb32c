#include "kent_standard.h"
#include "kent_case_internal.h"
#include "kent_standard_internal.h"

#include <assert.h>
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

size_t kent_standard_cell_index(const kent_standard *s, size_t soil, size_t size,
                                size_t fitting)
{
    assert(soil < s->soil_count && size < s->size_count && fitting < s->fitting_count);
    return (soil * s->size_count + size) * s->fitting_count + fitting;
}

void kent_standard_free(kent_standard *s)
{
    if (!s) return;
    const size_t cells = s->size_count * s->fitting_count * s->soil_count;
    for (size_t i = 0; s->cells && i < cells; i++) {
        kent_model_free(s->cells[i]);
    }
    free(s->cells);
    free(s->sizes);
    free(s->fittings);
    free(s->soils);
    free(s);
}

/* ---- what the file lists --------------------------------------------------------- */

/* A table on its way from its file. */
typedef struct reading {
    kent_filling *f; /* its root is the table's own group */
    const char *path;
    kent_standard *table;
    kent_standard_fitting fittings[KENT_STANDARD_FITTINGS];
    double outside[KENT_STANDARD_SIZES]; /* m */
} reading;

static void complain_at(reading *r, const kent_twig *twig, const char *fmt, ...)
    __attribute__((format(printf, 3, 4)));

static void complain_at(reading *r, const kent_twig *twig, const char *fmt, ...)
{
    char what[400];
    const kent_reader *reader = &r->f->reader;
    const kent_place place = kent_tree_place(reader->tree, twig);
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(what, sizeof what, fmt, args);
    va_end(args);
    kent_complain(reader->complaints, kent_tree_file(reader->tree, (size_t)place.file),
                  place.line, "%s", what);
}

/* A list of 1 to `most` elements; its names are to go into *names, [returned]. 0 after
 * a complaint. */
static size_t list_open(reading *r, const char *key, size_t most,
                        char (**names)[KENT_ID])
{
    const kent_twig *list = kent_record_field(&r->f->root, key)->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    if (!list) return 0; /* refused already */
    if (count == 0 || count > most) {
        complain_at(r, list, "%s has %zu elements; a table takes 1 to %zu of them", key,
                    count, most);
        return 0;
    }
    *names = kent_alloc(count, sizeof **names);
    if (!*names) r->f->reader.failed = true;
    return *names ? count : 0;
}

/* Takes the name of an element; one that stands there already is complained of. */
static void list_name(reading *r, const char *key, const kent_twig *twig,
                      const char *name, char (*names)[KENT_ID], size_t index)
{
    (void)snprintf(names[index], sizeof names[index], "%s", name);
    for (size_t i = 0; i < index; i++) {
        if (strcmp(names[i], names[index]) != 0) continue;
        complain_at(r, twig, "%s has \"%s\" twice; keep one", key, name);
        return;
    }
}

/* What the table goes by where the pressure acts on the bore alone, which a size has to
 * tell then; NULL: it does not. */
static const char *bore_by(const reading *r)
{
    const kent_field *joint = kent_record_field(&r->f->root, "joint");
    const kent_field *area = kent_record_field(&r->f->root, "thrust_area");
    const bool rigid = joint->index == KENT_FLANGED || joint->index == KENT_WELDED ||
                       joint->index == KENT_FUSED;
    if (rigid) return joint->text;
    return area->index == KENT_AREA_INSIDE ? area->text : NULL;
}

static void check_nominal(reading *r, kent_record *size, int row)
{
    const int area = kent_record_field(&r->f->root, "thrust_area")->index;
    if (!size->sound || area != KENT_AREA_NOMINAL || row >= 0) return;
    if (kent_record_has(size, "nominal_size")) return;
    kent_record_complain(&r->f->reader, size, NULL,
                         "thrust_area \"nominal\" goes by the size it is called by; "
                         "give nominal_size or pipe_class");
}

static void check_size(reading *r, kent_record *size, size_t index)
{
    kent_reader *reader = &r->f->reader;
    const int row = kent_record_field(size, "pipe_class")->index;
    const double of_row = row >= 0 ? r->f->catalogue->pipes[row].outside_diameter : NAN;
    const double wall = kent_record_number(size, "wall_thickness");
    const double lining = kent_record_number_or(size, "lining_thickness", 0.0);
    r->outside[index] = kent_record_number_or(size, "outside_diameter", of_row);
    if (!size->sound) return;
    if (isnan(r->outside[index])) {
        kent_record_complain(reader, size, NULL,
                             "its diameter is not known; give outside_diameter or "
                             "pipe_class");
    } else if (2.0 * (wall + lining) >= r->outside[index]) {
        kent_record_complain(reader, size, "wall_thickness",
                             "its wall and lining leave no bore within its outside "
                             "diameter");
    } else if (row < 0 && !kent_record_has(size, "wall_thickness") && bore_by(r)) {
        const bool joint = strcmp(bore_by(r), "inside") != 0;
        kent_record_complain(reader, size, NULL,
                             "with %s \"%s\" the pressure acts on the bore, and it is "
                             "not known; give wall_thickness or pipe_class",
                             joint ? "joint" : "thrust_area", bore_by(r));
    }
    check_nominal(r, size, row);
}

static void list_sizes(reading *r)
{
    kent_reader *reader = &r->f->reader;
    kent_standard *t = r->table;
    const kent_twig *list = kent_record_field(&r->f->root, "sizes")->twig;
    t->size_count = list_open(r, "sizes", KENT_STANDARD_SIZES, &t->sizes);
    for (size_t i = 0; i < t->size_count; i++) {
        const kent_twig *one = kent_twig_child(list, i);
        const char *name = NULL;
        kent_record size;
        if (kent_twig_type_of(one) == KENT_TWIG_GROUP) {
            kent_record_read(reader, one, "standard_size", "", i + 1, &size);
            name = kent_record_field(&size, "name")->text;
            check_size(r, &size, i);
        } else {
            const int row = kent_record_lookup(reader, &r->f->root, one, "sizes",
                                               KENT_SHELF_PIPE_CLASSES);
            name = kent_twig_text(one);
            if (row >= 0) {
                r->outside[i] = r->f->catalogue->pipes[row].outside_diameter;
            }
        }
        if (name) list_name(r, "sizes", one, name, t->sizes, i);
    }
}

static void list_soils(reading *r)
{
    kent_reader *reader = &r->f->reader;
    kent_standard *t = r->table;
    const kent_twig *list = kent_record_field(&r->f->root, "soils")->twig;
    t->soil_count = list_open(r, "soils", KENT_STANDARD_SOILS, &t->soils);
    for (size_t i = 0; i < t->soil_count; i++) {
        const kent_twig *one = kent_twig_child(list, i);
        kent_record soil;
        const char *name = NULL;
        if (kent_twig_type_of(one) == KENT_TWIG_GROUP) {
            kent_record_read(reader, one, "soil", "", i + 1, &soil);
            name = kent_record_field(&soil, "id")->text;
        } else {
            (void)kent_record_lookup(reader, &r->f->root, one, "soils",
                                     KENT_SHELF_SOIL_ROWS);
            name = kent_twig_text(one);
        }
        if (name) list_name(r, "soils", one, name, t->soils, i);
    }
}

/* ---- fittings -------------------------------------------------------------------- */

static const double PI = 3.14159265358979323846;

/* What may stand in `fittings`; most: rad, of the angle behind it, 0: none stands. */
static const struct {
    const char *word;
    kent_standard_fitting is;
    double most;
} WORDS[] = {
    {"dead-end", {KENT_DEAD_END, NULL, NULL}, 0.0},
    {"tee", {KENT_TEE, NULL, NULL}, 0.0},
    {"valve", {KENT_VALVE, NULL, NULL}, 0.0},
    {"bend", {KENT_BEND, NULL, "horizontal"}, 3.14159265358979323846},
    {"crest", {KENT_BEND, NULL, "crest"}, 0.5 * 3.14159265358979323846},
    {"sag", {KENT_BEND, NULL, "sag"}, 0.5 * 3.14159265358979323846},
    {"wye", {KENT_WYE, NULL, NULL}, 75.0 / 180.0 * 3.14159265358979323846},
};
enum { WORD_COUNT = sizeof WORDS / sizeof WORDS[0] };

/* The angle behind a word. */
static void read_angle(reading *r, const kent_twig *twig, size_t word,
                       const char *angle)
{
    kent_error err = {0};
    double si = NAN;
    const kent_status status =
        kent_units_read(r->f->reader.units, angle, KENT_ANGLE, &si, &err);
    if (status == KENT_E_NOMEM) r->f->reader.failed = true;
    if (status == KENT_E_INPUT) {
        complain_at(r, twig, "fittings: \"%.60s\": %s", kent_twig_text(twig), err.what);
    } else if (!(si > 0.0 && si <= WORDS[word].most)) {
        complain_at(r, twig,
                    "fittings: \"%.60s\": its angle is not above 0 and up to %g deg",
                    kent_twig_text(twig), WORDS[word].most / PI * 180.0);
    }
}

static void read_fitting(reading *r, const kent_twig *twig, kent_standard_fitting *out)
{
    const char *text = kent_twig_text(twig);
    for (size_t i = 0; text && i < WORD_COUNT; i++) {
        const size_t n = strlen(WORDS[i].word);
        const bool angled = WORDS[i].most > 0.0;
        if (strncmp(text, WORDS[i].word, n) != 0) continue;
        if (text[n] != (angled ? ' ' : '\0')) continue;
        *out = WORDS[i].is;
        if (!angled) return;
        out->angle = text + n + 1;
        read_angle(r, twig, i, out->angle);
        return;
    }
    complain_at(r, twig,
                "fittings: %s%.60s%s is no fitting of a table; it is one of "
                "\"dead-end\", \"tee\", \"valve\", \"bend 45 deg\", \"crest 45 deg\", "
                "\"sag 45 deg\", \"wye 45 deg\"",
                text ? "\"" : "", text ? text : kent_twig_type_word(twig),
                text ? "\"" : "");
}

static void list_fittings(reading *r)
{
    kent_standard *t = r->table;
    const kent_twig *list = kent_record_field(&r->f->root, "fittings")->twig;
    t->fitting_count = list_open(r, "fittings", KENT_STANDARD_FITTINGS, &t->fittings);
    for (size_t i = 0; i < t->fitting_count; i++) {
        const kent_twig *one = kent_twig_child(list, i);
        const char *name = kent_twig_text(one);
        read_fitting(r, one, &r->fittings[i]);
        if (name) list_name(r, "fittings", one, name, t->fittings, i);
    }
}

/* ---- every cell ------------------------------------------------------------------ */

/* What one case leaves on the shelves is not the next one's. */
static void clear_shelves(kent_reader *r)
{
    for (int i = 0; i < KENT_SHELF_PIPE_CLASSES; i++) {
        kent_directory_clear(&r->shelves[i]);
    }
}

static kent_status read_cell(const reading *r, size_t soil, size_t size, size_t fitting,
                             kent_filling *f, kent_error *err)
{
    const kent_record *root = &r->f->root;
    kent_standard_cell cell = {
        .root = root->twig,
        .size = kent_twig_child(kent_record_field(root, "sizes")->twig, size),
        .soil = kent_twig_child(kent_record_field(root, "soils")->twig, soil),
        .soil_id = r->table->soils[soil],
        .fitting = r->fittings[fitting],
        .pressure = r->table->pressure,
        .outside = r->outside[size],
        .what = r->table->what,
    };
    const size_t at = kent_standard_cell_index(r->table, soil, size, fitting);
    *f = (kent_filling){
        .reader = r->f->reader, .catalogue = r->f->catalogue, .shown = r->f->shown};
    const kent_status status = kent_fill_case(f, kent_standard_case(&cell), r->path,
                                              &r->table->cells[at], err);
    r->f->reader = f->reader; /* its shelves may have grown */
    clear_shelves(&r->f->reader);
    return status;
}

static kent_status read_cells(reading *r, kent_error *err)
{
    kent_standard *t = r->table;
    kent_status status = KENT_OK;
    kent_filling *f = kent_alloc(1, sizeof *f);
    t->cells = kent_alloc(t->soil_count * t->size_count * t->fitting_count,
                          sizeof(kent_model *));
    if (!f || !t->cells) {
        status = kent_error_nomem(err);
        goto done;
    }
    for (size_t i = 0; !status && i < t->soil_count; i++) {
        for (size_t k = 0; !status && k < t->size_count; k++) {
            for (size_t n = 0; !status && n < t->fitting_count; n++) {
                status = read_cell(r, i, k, n, f, err);
            }
        }
    }
done:
    free(f);
    return status;
}

static kent_status read_table(reading *r, kent_error *err)
{
    kent_filling *f = r->f;
    kent_reader *reader = &f->reader;
    kent_standard *t = r->table;
    kent_record_read(reader, kent_tree_root(reader->tree), "standard_table", "", 0,
                     &f->root);
    reader->system =
        kent_record_field(&f->root, "units")->index == 1 ? KENT_US : KENT_SI;
    const int what = kent_record_field(&f->root, "restraint")->index;
    t->pressure = kent_record_number(&f->root, "pressure");
    t->what = what >= 0 ? (kent_standard_what)what : KENT_STANDARD_BOTH;
    list_sizes(r);
    list_fittings(r);
    list_soils(r);
    if (reader->failed) return kent_error_nomem(err);
    if (reader->complaints->count > 0) return KENT_E_INPUT;
    const kent_status status = read_cells(r, err);
    if (status) return status;
    const kent_model *m = t->cells[0];
    t->factor = isnan(m->loads.factor[KENT_CASE_STATIC])
                    ? m->rules.safety_factor
                    : m->loads.factor[KENT_CASE_STATIC];
    return KENT_OK;
}

kent_status kent_standard_read(const char *path, const kent_catalogue *catalogue,
                               const kent_system *shown, kent_standard **out,
                               kent_complaints *complaints, kent_error *err)
{
    assert(path && catalogue && out && complaints && err);
    kent_tree *tree = NULL;
    kent_filling *f = kent_alloc(1, sizeof *f);
    reading r = {.f = f, .path = path, .table = kent_alloc(1, sizeof *r.table)};
    kent_status status = KENT_OK;
    if (!f || !r.table) {
        status = kent_error_nomem(err);
        goto done;
    }

    f->catalogue = catalogue;
    f->shown = shown;
    f->reader.complaints = complaints;
    status = kent_tree_read(path, &tree, complaints, err);
    if (!status) status = kent_units_new(&f->reader.units, err);
    if (status) goto done;
    f->reader.tree = tree;
    kent_catalogue_shelve(catalogue, &f->reader);
    status = read_table(&r, err);
    if (!status) {
        *out = r.table;
        r.table = NULL; /* handed over */
    }
done:
    kent_complaints_sort(complaints);
    kent_standard_free(r.table);
    if (f) {
        kent_reader_clear(&f->reader);
        kent_units_free(f->reader.units);
    }
    free(f);
    kent_tree_free(tree);
    return status;
}
