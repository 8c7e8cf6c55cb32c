/* A standard table for scripts: a row, or an object, per cell. */
#include "kent_json.h"
#include "kent_sink.h"
#include "kent_standard_told.h"
#include "kent_summary.h"

#include <math.h>
#include <stdio.h>

/* A cell with where it stands. */
typedef struct cell {
    const kent_standard *t;
    const kent_standard_cell_result *c;
    size_t soil, size, fitting;
} cell;

static cell cell_at(const kent_standard_result *r, size_t index)
{
    const kent_standard *t = r->table;
    return (cell){.t = t,
                  .c = &r->cells[index],
                  .soil = index / t->fitting_count / t->size_count,
                  .size = index / t->fitting_count % t->size_count,
                  .fitting = index % t->fitting_count};
}

/* ---- CSV ------------------------------------------------------------------------- */

static const kent_fitting *fitting_of(const cell *c)
{
    return &c->c->model->fittings[c->c->fitting];
}

static double of_block(const cell *c, double value)
{
    return c->c->sized && c->c->holding.block.type != KENT_BLOCK_NONE ? value : NAN;
}

static double of_face(const cell *c, double value)
{
    return c->c->holding.block.has_face ? of_block(c, value) : NAN;
}

static double outside(const cell *c) { return c->c->model->pipes[0].outside_diameter; }
static double sealed(const cell *c)
{
    return c->c->model->ports[fitting_of(c)->port_first].seal_diameter;
}
static double pressure(const cell *c) { return c->t->pressure; }
static double thrust(const cell *c) { return c->c->thrust; }
static double factor(const cell *c) { return c->t->factor; }
static double area(const cell *c) { return c->c->holding.block.bearing_area; }
static double bears(const cell *c) { return c->c->holding.allowable_bearing; }
static double width(const cell *c) { return of_block(c, c->c->holding.block.width); }
static double height(const cell *c) { return of_block(c, c->c->holding.block.height); }
static double thickness(const cell *c)
{
    return of_block(c, c->c->holding.block.thickness);
}
static double volume(const cell *c) { return of_block(c, c->c->holding.block.volume); }
static double use(const cell *c) { return of_block(c, c->c->holding.utilisation); }
static double face_width(const cell *c)
{
    return of_face(c, c->c->holding.block.face.width);
}
static double face_height(const cell *c)
{
    return of_face(c, c->c->holding.block.face.height);
}
static double face_thickness(const cell *c)
{
    return of_face(c, c->c->holding.block.face_thickness);
}
static double face_volume(const cell *c)
{
    return of_face(c, c->c->holding.block.face_volume);
}
static double length(const cell *c)
{
    const bool told = c->t->what != KENT_STANDARD_BLOCKS && c->c->has_length;
    return told ? c->c->holding.restrained_length : NAN;
}
static double cover(const cell *c) { return c->c->model->ground.cover; }
static double water(const cell *c) { return c->c->model->ground.water_table; }

static const char *soil(const cell *c) { return c->t->soils[c->soil]; }
static const char *size(const cell *c) { return c->t->sizes[c->size]; }
static const char *fitting(const cell *c) { return c->t->fittings[c->fitting]; }
static const char *source(const cell *c)
{
    const kent_model *m = c->c->model;
    return m->soils[m->ground.soil].source;
}
static const char *rules(const cell *c) { return c->c->model->rules.id; }
static const char *type(const cell *c)
{
    return c->c->sized ? kent_block_word(c->c->holding.block.type) : "none";
}
static const char *no_block(const cell *c) { return kent_standard_no_block(c->c); }
static const char *no_length(const cell *c) { return kent_standard_no_length(c->c); }

static const struct {
    const char *head;
    const char *(*words)(const cell *c); /* NULL: a number */
    double (*number)(const cell *c);
    kent_kind kind;
} COLUMNS[] = {
    {"soil", soil, NULL, KENT_RATIO},
    {"size", size, NULL, KENT_RATIO},
    {"fitting", fitting, NULL, KENT_RATIO},
    {"outside diameter", NULL, outside, KENT_DIAMETER},
    {"thrust diameter", NULL, sealed, KENT_DIAMETER},
    {"design pressure", NULL, pressure, KENT_PRESSURE},
    {"thrust", NULL, thrust, KENT_FORCE},
    {"safety factor", NULL, factor, KENT_RATIO},
    {"allowable bearing", NULL, bears, KENT_STRESS},
    {"area asked for", NULL, area, KENT_AREA},
    {"block", type, NULL, KENT_RATIO},
    {"width", NULL, width, KENT_LENGTH},
    {"height", NULL, height, KENT_LENGTH},
    {"thickness", NULL, thickness, KENT_LENGTH},
    {"volume", NULL, volume, KENT_VOLUME},
    {"face width", NULL, face_width, KENT_LENGTH},
    {"face height", NULL, face_height, KENT_LENGTH},
    {"face thickness", NULL, face_thickness, KENT_LENGTH},
    {"face volume", NULL, face_volume, KENT_VOLUME},
    {"utilisation", NULL, use, KENT_RATIO},
    {"restrained length", NULL, length, KENT_LENGTH},
    {"no block because", no_block, NULL, KENT_RATIO},
    {"no restrained length because", no_length, NULL, KENT_RATIO},
    {"cover", NULL, cover, KENT_LENGTH},
    {"ground water depth", NULL, water, KENT_LENGTH},
    {"soil source", source, NULL, KENT_RATIO},
    {"design rules", rules, NULL, KENT_RATIO},
};
enum { COLUMN_COUNT = sizeof COLUMNS / sizeof COLUMNS[0] };

static void add_row(const cell *c, kent_system units, kent_text *out)
{
    for (size_t k = 0; k < COLUMN_COUNT; k++) {
        if (k > 0) kent_text_add(out, ",");
        if (COLUMNS[k].words) {
            const char *words = COLUMNS[k].words(c);
            kent_summary_field(out, words ? words : "");
            continue;
        }
        const double value =
            kent_units_shown(COLUMNS[k].kind, units, COLUMNS[k].number(c));
        if (isfinite(value)) kent_text_add(out, "%.8g", value);
    }
    kent_text_add(out, "\n");
}

kent_status kent_report_standard_csv(const kent_standard_result *r,
                                     const kent_report_options *o, kent_sink sink)
{
    kent_text out = {0};
    for (size_t k = 0; k < COLUMN_COUNT; k++) {
        const char *unit = kent_units_display(COLUMNS[k].kind, o->units).unit;
        kent_text_add(&out, "%s%s", k > 0 ? "," : "", COLUMNS[k].head);
        if (unit[0] != '\0') kent_text_add(&out, " [%s]", unit);
    }
    kent_text_add(&out, "\n");
    for (size_t i = 0; i < r->cell_count; i++) {
        const cell c = cell_at(r, i);
        add_row(&c, o->units, &out);
    }
    const kent_status status = kent_sink_flush(sink, &out);
    kent_text_clear(&out);
    return status;
}

/* ---- JSON ------------------------------------------------------------------------ */

static json_t *words_or_null(const char *words)
{
    return words ? kent_json_words(words) : json_null();
}

static json_t *block_of(const cell *c)
{
    kent_object o = kent_object_new();
    kent_object_set(&o, "type", kent_json_words(type(c)));
    kent_object_set(&o, "bearing_area_m2", kent_json_real(area(c)));
    kent_object_set(&o, "width_m", kent_json_real(width(c)));
    kent_object_set(&o, "height_m", kent_json_real(height(c)));
    kent_object_set(&o, "thickness_m", kent_json_real(thickness(c)));
    kent_object_set(&o, "volume_m3", kent_json_real(volume(c)));
    kent_object_set(&o, "face_width_m", kent_json_real(face_width(c)));
    kent_object_set(&o, "face_height_m", kent_json_real(face_height(c)));
    kent_object_set(&o, "face_thickness_m", kent_json_real(face_thickness(c)));
    kent_object_set(&o, "face_volume_m3", kent_json_real(face_volume(c)));
    kent_object_set(&o, "utilisation", kent_json_real(use(c)));
    return kent_object_done(o);
}

static json_t *cell_json(const cell *c)
{
    kent_object o = kent_object_new();
    char id[3 * KENT_ID];
    (void)snprintf(id, sizeof id, "%s/%s/%s", soil(c), size(c), fitting(c));
    kent_object_set(&o, "id", kent_json_words(id));
    kent_object_set(&o, "soil", kent_json_words(soil(c)));
    kent_object_set(&o, "size", kent_json_words(size(c)));
    kent_object_set(&o, "fitting", kent_json_words(fitting(c)));
    kent_object_set(&o, "outside_diameter_m", kent_json_real(outside(c)));
    kent_object_set(&o, "thrust_diameter_m", kent_json_real(sealed(c)));
    kent_object_set(&o, "thrust_N", kent_json_real(thrust(c)));
    kent_object_set(&o, "allowable_bearing_Pa", kent_json_real(bears(c)));
    kent_object_set(&o, "block",
                    c->t->what == KENT_STANDARD_JOINTS ? json_null() : block_of(c));
    kent_object_set(&o, "restrained_length_m", kent_json_real(length(c)));
    kent_object_set(&o, "no_block_because", words_or_null(no_block(c)));
    kent_object_set(&o, "no_restrained_length_because", words_or_null(no_length(c)));
    kent_object_set(&o, "cautions", kent_json_notes(&c->c->holding.cautions));
    return kent_object_done(o);
}

kent_status kent_report_standard_json(const kent_standard_result *r, kent_sink sink)
{
    const kent_model *m = r->cells[0].model;
    kent_writer w = {.model = m, .sink = sink};
    kent_notes notes = {0};
    char checksum[20];
    (void)snprintf(checksum, sizeof checksum, "%016llx", m->checksum);
    kent_standard_assumptions(r, KENT_SI, &notes);
    kent_json_put_text(&w,
                       "{\"format\": 1,\n\"program\": \"kentledge\",\n\"version\": ");
    kent_json_put(&w, kent_json_words(KENT_VERSION));
    kent_json_put_text(&w, ",\n\"title\": ");
    kent_json_put(&w, kent_json_words(m->title));
    kent_json_put_text(&w, ",\n\"table_checksum\": ");
    kent_json_put(&w, kent_json_words(checksum));
    kent_json_put_text(&w, ",\n\"design_pressure_Pa\": ");
    kent_json_put(&w, kent_json_real(r->table->pressure));
    kent_json_put_text(&w, ",\n\"safety_factor\": ");
    kent_json_put(&w, kent_json_real(r->table->factor));
    kent_json_put_text(&w, ",\n\"cover_m\": ");
    kent_json_put(&w, kent_json_real(m->ground.cover));
    kent_json_put_text(&w, ",\n\"water_table_m\": ");
    kent_json_put(&w, kent_json_real(m->ground.water_table));
    kent_json_put_text(&w, ",\n\"design_rules\": ");
    kent_json_put(&w, kent_json_words(m->rules.id));
    kent_json_put_text(&w, ",\n\"stands_on\": ");
    kent_json_put(&w, kent_json_notes(&notes));
    kent_json_open_list(&w, ",\n\"cells\": [");
    for (size_t i = 0; i < r->cell_count; i++) {
        const cell c = cell_at(r, i);
        kent_json_put_element(&w, cell_json(&c));
    }
    kent_json_put_text(&w, "]}\n");
    if (!w.status && notes.failed) w.status = KENT_E_NOMEM;
    kent_notes_clear(&notes);
    return w.status;
}
