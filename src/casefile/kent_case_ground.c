/* Soils, and the ground along the main. */
#include "kent_case_internal.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

/* ---- soils ----------------------------------------------------------------------- */

/* What a row of the catalogue says of bearing. */
static void assume_bearing(kent_filling *f, const kent_soil *row)
{
    static const char *const WHAT[] = {
        [KENT_BEARING_CONSTANT] = "allowable bearing",
        [KENT_BEARING_BY_DEPTH] = "bearing by depth",
        [KENT_BEARING_GRADIENT] = "bearing per depth",
        [KENT_BEARING_PASSIVE] = "share of the passive earth pressure",
    };
    char what[96];
    (void)snprintf(what, sizeof what, "%s of %s", WHAT[row->route], row->id);
    switch (row->route) {
    case KENT_BEARING_CONSTANT:
        kent_fill_assume_value(f, what, row->allowable_bearing, KENT_STRESS,
                               row->source);
        break;
    case KENT_BEARING_BY_DEPTH: {
        const kent_depth_row *last = &row->by_depth[row->by_depth_count - 1];
        char least[64];
        char most[64];
        char value[140];
        kent_fill_show(f, row->by_depth[0].bearing, KENT_STRESS, least, sizeof least);
        kent_fill_show(f, last->bearing, KENT_STRESS, most, sizeof most);
        (void)snprintf(value, sizeof value, "%s to %s", least, most);
        kent_fill_assume(f, what, value, row->source);
        break;
    }
    case KENT_BEARING_GRADIENT:
        kent_fill_assume_value(f, what, row->bearing_gradient, KENT_UNIT_WEIGHT,
                               row->source);
        break;
    case KENT_BEARING_PASSIVE:
        kent_fill_assume_value(f, what, row->passive_share, KENT_RATIO, row->source);
        break;
    }
}

static bool gives_bearing(const kent_record *record)
{
    return kent_record_has(record, "allowable_bearing") ||
           kent_record_has(record, "bearing_by_depth") ||
           kent_record_has(record, "bearing_gradient") ||
           kent_record_has(record, "passive_share");
}

static void check_soil(kent_filling *f, kent_record *record, const kent_soil *s)
{
    const bool unbearing =
        s->route == KENT_BEARING_CONSTANT && s->allowable_bearing <= 0.0;
    if (!kent_soil_has_bearing(s)) {
        kent_record_complain(&f->reader, record, NULL,
                             "its bearing is missing; give allowable_bearing, "
                             "bearing_by_depth, bearing_gradient or passive_share, or "
                             "name a soil of the catalogue by from");
    } else if (s->route == KENT_BEARING_PASSIVE &&
               (isnan(s->unit_weight) ||
                (isnan(s->friction_angle) && isnan(s->cohesion)))) {
        kent_record_complain(&f->reader, record, "passive_share",
                             "passive_share needs %s, from which the passive earth "
                             "pressure follows",
                             isnan(s->unit_weight) ? "unit_weight"
                                                   : "friction_angle or cohesion");
    } else if (s->route == KENT_BEARING_PASSIVE && !(s->friction_angle > 0.0) &&
               !(s->cohesion > 0.0)) {
        kent_record_complain(
            &f->reader, record, "passive_share",
            "passive_share is of the earth pressure that friction_angle "
            "and cohesion give, and both are nil; give the soil's "
            "strength, or its bearing in another way");
    } else if (gives_bearing(record) && !kent_record_has(record, "factor_inside") &&
               !unbearing) {
        char what[96];
        (void)snprintf(what, sizeof what, "factor inside the bearing of %s", s->id);
        kent_fill_assume(f, what, "1.0", "factor_inside not given");
    }
}

/* Ground that held nothing, and of which the case says that it was made good. */
static void caution_made_good(kent_filling *f, const kent_soil *s)
{
    if (s->nature == KENT_NATURAL || s->unreliable) return;
    kent_notes_add(&f->model->cautions,
                   "soil \"%s\" is %s, and relied on because the case says so; its "
                   "source should say how it was made good",
                   s->id, kent_nature_word(s->nature));
}

void kent_fill_soil(kent_filling *f, kent_record *record, size_t index)
{
    kent_soil *s = &f->model->soils[index];
    const int row = kent_record_field(record, "from")->index;
    *s = kent_soil_blank();
    (void)snprintf(s->source, sizeof s->source, "given in the case");
    if (row >= 0) {
        const kent_soil *from = &f->catalogue->soils[row];
        *s = *from;
        (void)snprintf(s->source, sizeof s->source, "given in the case, else %.150s",
                       from->source);
        if (!gives_bearing(record)) assume_bearing(f, from);
    }
    if (kent_record_has(record, "source")) {
        kent_record_copy(record, "source", NULL, s->source, sizeof s->source);
    }
    kent_record_copy(record, "id", NULL, s->id, sizeof s->id);
    kent_record_soil(&f->reader, record, s);
    s->place = record->place;
    if (record->sound) check_soil(f, record, s);
    caution_made_good(f, s);
}

int kent_fill_soil_index(kent_filling *f, const kent_record *record, const char *key)
{
    kent_model *m = f->model;
    const kent_field *field = kent_record_field(record, key);
    if (!field->from_catalogue) return field->index;

    const kent_soil *row = &f->catalogue->soils[field->index];
    for (size_t i = 0; i < m->soil_count; i++) {
        if (strcmp(m->soils[i].id, row->id) == 0) return (int)i;
    }
    m->soils[m->soil_count] = *row; /* room was made for every row */
    assume_bearing(f, row);
    return (int)m->soil_count++;
}

/* ---- ground ---------------------------------------------------------------------- */

void kent_fill_ground(kent_filling *f)
{
    kent_record r;
    const bool there = kent_fill_group(f, &f->root, "ground", &r);
    kent_ground *g = &f->model->ground;
    if (there) {
        g->soil = kent_fill_soil_index(f, &r, "soil");
        g->cover = kent_record_number(&r, "cover");
        g->wrapped = kent_record_switch(&r, "wrapped", false);
        g->trench = kent_record_field(&r, "trench")->index;
        g->backfill = kent_fill_soil_index(f, &r, "backfill");
    }
    if (there && kent_record_has(&r, "water_table")) {
        g->water_table = kent_record_number(&r, "water_table");
    } else {
        kent_fill_assume(f, "ground water", "none",
                         "no water_table given for the ground");
    }
}

/* A place along a pipe has one ground. */
static void check_overlap(kent_filling *f, kent_record *record, size_t index)
{
    const kent_ground_zone *z = &f->model->ground_zones[index];
    for (size_t i = 0; i < index; i++) {
        const kent_ground_zone *other = &f->model->ground_zones[i];
        if (other->pipe != z->pipe || !(z->from < other->to && other->from < z->to)) {
            continue;
        }
        kent_record_complain(
            &f->reader, record, "from",
            "it overlaps the zone of the same pipe at line %d; let one "
            "end where the next starts",
            other->place.line);
        return;
    }
}

static bool says_ground(const kent_record *record)
{
    static const char *const KEYS[] = {"soil",   "cover",    "water_table",
                                       "trench", "backfill", "casing"};
    for (size_t i = 0; i < sizeof KEYS / sizeof KEYS[0]; i++) {
        if (kent_record_has(record, KEYS[i])) return true;
    }
    return false;
}

void kent_fill_ground_zone(kent_filling *f, kent_record *record, size_t index)
{
    kent_ground_zone *z = &f->model->ground_zones[index];
    *z = (kent_ground_zone){.pipe = kent_record_field(record, "pipe")->index,
                            .from = kent_record_number(record, "from"),
                            .to = kent_record_number(record, "to"),
                            .soil = kent_fill_soil_index(f, record, "soil"),
                            .cover = kent_record_number(record, "cover"),
                            .water_table = kent_record_number(record, "water_table"),
                            .trench = kent_record_field(record, "trench")->index,
                            .backfill = kent_fill_soil_index(f, record, "backfill"),
                            .casing = kent_record_switch(record, "casing", false),
                            .place = record->place};
    if (!record->sound) return;
    if (!(z->from < z->to)) {
        kent_record_complain(&f->reader, record, "to",
                             "to must lie beyond from; stations count along the pipe's "
                             "route");
    } else if (!says_ground(record)) {
        kent_record_complain(&f->reader, record, NULL,
                             "it says nothing of the ground; give soil, cover, "
                             "water_table, trench, backfill or casing");
    } else {
        check_overlap(f, record, index);
    }
}
