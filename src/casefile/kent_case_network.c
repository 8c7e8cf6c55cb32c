/* Points, and the devices that stand at them. */
#include "kent_case_internal.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static void check_point(kent_filling *f, kent_record *record, const kent_point *p)
{
    kent_reader *r = &f->reader;
    const bool placed = kent_record_has(record, "x") && kent_record_has(record, "y");
    if (!record->sound) return;
    if (kent_record_has(record, "x") != kent_record_has(record, "y")) {
        kent_record_complain(r, record, isnan(p->at.x) ? "y" : "x",
                             "x and y stand together: give both or neither");
    } else if (kent_record_has(record, "cover") &&
               kent_record_has(record, "ground_level")) {
        kent_record_complain(r, record, "ground_level",
                             "cover and ground_level are both given; keep one");
    } else if (placed && kent_record_has(record, "turn")) {
        kent_record_complain(r, record, "turn",
                             "turn stands where there are no coordinates; x and y say "
                             "how the route turns, so leave turn or x and y out");
    } else if (kent_record_has(record, "station_ahead") &&
               !kent_record_has(record, "station")) {
        kent_record_complain(
            r, record, "station_ahead",
            "station_ahead needs station, the station on arrival here");
    }
}

void kent_fill_point(kent_filling *f, kent_record *record, size_t index)
{
    kent_point *p = &f->model->points[index];
    *p = kent_point_blank();
    kent_record_copy(record, "id", NULL, p->id, sizeof p->id);
    p->at =
        (kent_vec3){kent_record_number(record, "x"), kent_record_number(record, "y"),
                    kent_record_number(record, "z")};
    p->cover = kent_record_number(record, "cover");
    p->ground_level = kent_record_number(record, "ground_level");
    p->water_table = kent_record_number(record, "water_table");
    p->station = kent_record_number(record, "station");
    p->station_ahead = kent_record_number(record, "station_ahead");
    p->turn = kent_record_number(record, "turn");
    p->curve_radius = kent_record_number(record, "curve_radius");
    p->soil = kent_fill_soil_index(f, record, "soil");
    p->record = kent_record_switch(record, "record", false);
    p->place = record->place;
    check_point(f, record, p);
}

/* ---- ends and devices ------------------------------------------------------------ */

void kent_fill_fixed_level(kent_filling *f, kent_record *record, size_t index)
{
    kent_fixed_level *l = &f->model->fixed_levels[index];
    *l = (kent_fixed_level){.point = kent_record_field(record, "at")->index,
                            .level = kent_record_number(record, "level"),
                            .loss = kent_record_number_or(record, "loss", 0.0),
                            .node = -1,
                            .place = record->place};
}

void kent_fill_outflow(kent_filling *f, kent_record *record, size_t index)
{
    kent_outflow *o = &f->model->outflows[index];
    *o = (kent_outflow){.point = kent_record_field(record, "at")->index,
                        .flow = kent_record_number(record, "flow"),
                        .pressure_dependent =
                            kent_record_switch(record, "pressure_dependent", false),
                        .full_pressure = kent_record_number(record, "full_pressure"),
                        .node = -1,
                        .place = record->place};
    if (!record->sound) return;
    if (o->pressure_dependent && isnan(o->full_pressure)) {
        kent_record_complain(
            &f->reader, record, "pressure_dependent",
            "pressure_dependent needs full_pressure, at which the whole "
            "flow is drawn");
    } else if (!o->pressure_dependent && !isnan(o->full_pressure)) {
        kent_record_complain(&f->reader, record, "full_pressure",
                             "full_pressure is of an outflow with pressure_dependent = "
                             "true; write that too, or leave it out");
    } else if (o->pressure_dependent && o->flow < 0.0) {
        kent_record_complain(&f->reader, record, "flow",
                             "a flow into the main cannot be pressure_dependent");
    }
}

/* The type's curve, or the case's own. */
static void fill_curve(kent_filling *f, kent_record *record, kent_valve *v)
{
    const int type = kent_record_field(record, "type")->index;
    const bool own = kent_record_has(record, "characteristic");
    const kent_valve_type *row = type >= 0 && (size_t)type < f->catalogue->valve_count
                                     ? &f->catalogue->valves[type]
                                     : NULL;
    if (own && kent_record_has(record, "type") && !(row && row->curve.count == 0)) {
        kent_record_complain(&f->reader, record, "characteristic",
                             "type and characteristic are both given; keep one");
    } else if (row && row->curve.count == 0 && !own) {
        kent_record_complain(&f->reader, record, "type",
                             "\"%s\" is known fully open only; give its characteristic "
                             "as well",
                             row->id);
    }
    if (own) {
        (void)kent_record_curve(&f->reader, record, &v->curve);
        (void)snprintf(v->type, sizeof v->type, "%s", row ? row->id : "given");
    } else if (row) {
        v->curve = row->curve;
        memcpy(v->type, row->id, sizeof v->type);
    } else {
        v->curve = kent_valve_curve_linear();
        (void)snprintf(v->type, sizeof v->type, "linear");
        if (!kent_record_has(record, "type")) {
            kent_fill_assume(f, "type of valves that name none", "linear",
                             "no type and no characteristic given");
        }
    }
}

static const char *const CAPACITY_KEYS[] = {"loss", "kv", "cv", "flow"};

/* The first of the keys that is given, NULL: none; complains where two are. */
static const char *given_capacity(kent_filling *f, kent_record *record, size_t count)
{
    const char *first = NULL;
    for (size_t i = 0; i < count; i++) {
        if (!kent_record_has(record, CAPACITY_KEYS[i])) continue;
        if (first) {
            kent_record_complain(&f->reader, record, CAPACITY_KEYS[i],
                                 "%s and %s are both given; keep one", first,
                                 CAPACITY_KEYS[i]);
            return first;
        }
        first = CAPACITY_KEYS[i];
    }
    return first;
}

/* m^2.5/s by a key; NAN where it gives none. */
static double capacity_by(const kent_filling *f, const kent_record *record,
                          const char *key, double size)
{
    const double g = f->model->gravity;
    const double value = kent_record_number(record, key);
    return strcmp(key, "kv") == 0     ? kent_valve_capacity_from_kv(value, g)
           : strcmp(key, "cv") == 0   ? kent_valve_capacity_from_cv(value, g)
           : strcmp(key, "loss") == 0 ? kent_valve_capacity_from_loss(value, size, g)
                                      : NAN;
}

double kent_fill_capacity(kent_filling *f, kent_record *record, double size)
{
    const char *given = given_capacity(f, record, 3);
    if (!record->sound) return NAN;
    if (given) return capacity_by(f, record, given, size);
    kent_record_complain(&f->reader, record, NULL,
                         "what it passes is not known; give loss, kv or cv");
    return NAN;
}

/* One of loss, kv, cv and flow; else the type's loss. */
static void fill_capacity(kent_filling *f, kent_record *record, kent_valve *v)
{
    const char *first = given_capacity(f, record, 4);
    v->capacity = NAN;
    v->flow = kent_record_number(record, "flow");
    if (!record->sound) return;
    if (!first) {
        const kent_valve_type *row = kent_catalogue_valve(f->catalogue, v->type);
        if (!row || isnan(row->loss)) {
            kent_record_complain(
                &f->reader, record, NULL,
                "what it passes is not known; give loss, kv, cv or flow");
            return;
        }
        char what[96];
        (void)snprintf(what, sizeof what, "loss of %s valves, fully open", row->id);
        kent_fill_assume_value(f, what, row->loss, KENT_RATIO, row->from.source);
        v->capacity =
            kent_valve_capacity_from_loss(row->loss, v->size, f->model->gravity);
        return;
    }
    v->capacity = capacity_by(f, record, first, v->size);
    if (isnan(v->capacity) && v->opening <= 0.0) {
        kent_record_complain(
            &f->reader, record, "flow",
            "a valve that is closed in the steady state passes no flow; "
            "give loss, kv or cv");
    }
}

void kent_fill_valve(kent_filling *f, kent_record *record, size_t index)
{
    kent_valve *v = &f->model->valves[index];
    kent_record_copy(record, "id", NULL, v->id, sizeof v->id);
    v->point = kent_record_field(record, "at")->index;
    v->size = kent_record_number(record, "size");
    v->opening = kent_record_number_or(record, "opening", 1.0);
    v->discharge_level = kent_record_number(record, "discharge_level");
    v->node[0] = v->node[1] = -1;
    v->place = record->place;
    fill_curve(f, record, v);
    fill_capacity(f, record, v);
}
