/* Check, control, relief and air valves, tanks and vessels. */
#include "kent_case_internal.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

/* ---- what nobody gave ------------------------------------------------------------ */

void kent_fill_assume_of(kent_filling *f, const kent_record *record,
                         kent_device_kind kind, const char *key, const char *value,
                         const char *why)
{
    char what[160];
    const char *id = kent_record_field(record, "id")->text;
    (void)snprintf(what, sizeof what, "%s of %s %.47s", key, kent_device_word(kind),
                   id ? id : "");
    kent_fill_assume(f, what, value, why);
}

double kent_fill_usual(kent_filling *f, const kent_record *record,
                       kent_device_kind kind, const char *key, double usual,
                       const char *why)
{
    char value[64] = "none";
    const kent_field *field = kent_record_field(record, key);
    if (field->twig) return field->number;
    if (isfinite(usual)) {
        const kent_kind unit = record->keys[field - record->fields].kind;
        kent_fill_show(f, usual, unit, value, sizeof value);
    }
    kent_fill_assume_of(f, record, kind, key, value, why);
    return usual;
}

/* The point's level; NAN where the point is not known. */
static double level_of(const kent_filling *f, int point)
{
    return point >= 0 ? f->model->points[point].at.z : NAN;
}

/* ---- in line --------------------------------------------------------------------- */

void kent_fill_check_valve(kent_filling *f, kent_record *record, size_t index)
{
    kent_check_valve *c = &f->model->check_valves[index];
    kent_record_copy(record, "id", NULL, c->id, sizeof c->id);
    c->point = kent_record_field(record, "at")->index;
    c->flow_to = kent_record_field(record, "flow_to")->index;
    c->size = kent_record_number(record, "size");
    c->loss = kent_record_number(record, "loss");
    c->delay = kent_fill_usual(f, record, KENT_DEVICE_CHECK_VALVE, "delay", 0.0,
                               "not given: it shuts as the flow reverses");
    c->node[0] = c->node[1] = -1;
    c->place = record->place;
}

void kent_fill_control_valve(kent_filling *f, kent_record *record, size_t index)
{
    kent_control_valve *c = &f->model->control_valves[index];
    const int holds = kent_record_field(record, "holds")->index;
    kent_record_copy(record, "id", NULL, c->id, sizeof c->id);
    c->point = kent_record_field(record, "at")->index;
    c->flow_to = kent_record_field(record, "flow_to")->index;
    c->holds = holds >= 0 ? (kent_holds)holds : KENT_HOLDS_DOWNSTREAM;
    c->set_pressure = kent_record_number(record, "set_pressure");
    c->size = kent_record_number(record, "size");
    c->capacity = kent_fill_capacity(f, record, c->size);
    c->opening_time = kent_record_number(record, "opening_time");
    c->closure_time = kent_record_number(record, "closure_time");
    c->node[0] = c->node[1] = -1;
    c->place = record->place;
}

/* ---- tanks and vessels ----------------------------------------------------------- */

void kent_fill_surge_tank(kent_filling *f, kent_record *record, size_t index)
{
    static const kent_device_kind KIND = KENT_DEVICE_SURGE_TANK;
    kent_surge_tank *t = &f->model->surge_tanks[index];
    kent_record_copy(record, "id", NULL, t->id, sizeof t->id);
    t->point = kent_record_field(record, "at")->index;
    t->next_to = kent_record_field(record, "next_to")->index;
    t->area = kent_record_number(record, "area");
    t->bottom_level = kent_record_number(record, "bottom_level");
    t->overflow_level = kent_fill_usual(f, record, KIND, "overflow_level", INFINITY,
                                        "not given: it never overflows");
    t->connection_diameter = kent_record_number(record, "connection_diameter");
    t->loss_in = kent_fill_usual(f, record, KIND, "loss_in", 0.0, "not given");
    t->loss_out = kent_fill_usual(f, record, KIND, "loss_out", 0.0, "not given");
    t->node = -1;
    t->place = record->place;
    if (record->sound && t->overflow_level <= t->bottom_level) {
        kent_record_complain(&f->reader, record, "overflow_level",
                             "overflow_level is not above bottom_level");
    }
}

void kent_fill_one_way_tank(kent_filling *f, kent_record *record, size_t index)
{
    static const kent_device_kind KIND = KENT_DEVICE_ONE_WAY_TANK;
    kent_one_way_tank *t = &f->model->one_way_tanks[index];
    kent_record_copy(record, "id", NULL, t->id, sizeof t->id);
    t->point = kent_record_field(record, "at")->index;
    t->next_to = kent_record_field(record, "next_to")->index;
    t->area = kent_record_number(record, "area");
    t->level = kent_record_number(record, "level");
    t->bottom_level = kent_fill_usual(f, record, KIND, "bottom_level", -INFINITY,
                                      "not given: it is never empty");
    t->connection_diameter = kent_record_number(record, "connection_diameter");
    t->loss_out = kent_fill_usual(f, record, KIND, "loss_out", 0.0, "not given");
    t->node = -1;
    t->place = record->place;
    if (record->sound && t->bottom_level >= t->level) {
        kent_record_complain(&f->reader, record, "bottom_level",
                             "bottom_level is not below level: the tank is empty");
    }
}

void kent_fill_air_vessel(kent_filling *f, kent_record *record, size_t index)
{
    static const kent_device_kind KIND = KENT_DEVICE_AIR_VESSEL;
    kent_air_vessel *v = &f->model->air_vessels[index];
    kent_record_copy(record, "id", NULL, v->id, sizeof v->id);
    v->point = kent_record_field(record, "at")->index;
    v->next_to = kent_record_field(record, "next_to")->index;
    v->total_volume = kent_record_number(record, "total_volume");
    v->gas_volume = kent_record_number(record, "gas_volume");
    v->polytropic_exponent =
        kent_fill_usual(f, record, KIND, "polytropic_exponent", 1.2,
                        "not given: between slow and quick changes of the gas");
    v->water_level = kent_fill_usual(f, record, KIND, "water_level",
                                     level_of(f, v->point), "not given: the point's");
    v->area = kent_fill_usual(f, record, KIND, "area", INFINITY,
                              "not given: its level stays while it fills or empties");
    v->connection_diameter = kent_record_number(record, "connection_diameter");
    v->loss_in = kent_fill_usual(f, record, KIND, "loss_in", 0.0, "not given");
    v->loss_out = kent_fill_usual(f, record, KIND, "loss_out", 0.0, "not given");
    v->node = -1;
    v->place = record->place;
    if (record->sound && v->gas_volume >= v->total_volume) {
        kent_record_complain(&f->reader, record, "gas_volume",
                             "gas_volume is not below total_volume: there is no water "
                             "in it");
    }
}

/* ---- valves beside the main ------------------------------------------------------ */

static void check_relief(kent_filling *f, kent_record *record,
                         const kent_relief_valve *v)
{
    kent_reader *r = &f->reader;
    if (!record->sound) return;
    if (v->full_open_pressure <= v->set_pressure) {
        kent_record_complain(r, record, "full_open_pressure",
                             "full_open_pressure is not above set_pressure, at which "
                             "it starts to open");
    } else if (v->low_set_pressure >= v->set_pressure) {
        kent_record_complain(r, record, "low_set_pressure",
                             "low_set_pressure is not below set_pressure");
    } else if (isnan(v->low_set_pressure) != isnan(v->hold_time)) {
        kent_record_complain(
            r, record, isnan(v->hold_time) ? "low_set_pressure" : "hold_time",
            "low_set_pressure and hold_time stand together: give both, or "
            "neither for a valve that does not anticipate");
    }
}

void kent_fill_relief_valve(kent_filling *f, kent_record *record, size_t index)
{
    static const kent_device_kind KIND = KENT_DEVICE_RELIEF_VALVE;
    kent_relief_valve *v = &f->model->relief_valves[index];
    kent_record_copy(record, "id", NULL, v->id, sizeof v->id);
    v->point = kent_record_field(record, "at")->index;
    v->next_to = kent_record_field(record, "next_to")->index;
    v->set_pressure = kent_record_number(record, "set_pressure");
    v->full_open_pressure = kent_record_number(record, "full_open_pressure");
    v->low_set_pressure = kent_record_number(record, "low_set_pressure");
    v->hold_time = kent_record_number(record, "hold_time");
    v->size = kent_record_number(record, "size");
    v->capacity = kent_fill_capacity(f, record, v->size);
    v->opening_time = kent_fill_usual(f, record, KIND, "opening_time", 0.0,
                                      "not given: it opens at once");
    v->closure_time = kent_fill_usual(f, record, KIND, "closure_time", 0.0,
                                      "not given: it shuts at once");
    v->discharge_level =
        kent_fill_usual(f, record, KIND, "discharge_level", level_of(f, v->point),
                        "not given: the point's");
    v->node = -1;
    v->place = record->place;
    check_relief(f, record, v);
}

void kent_fill_air_valve(kent_filling *f, kent_record *record, size_t index)
{
    static const kent_device_kind KIND = KENT_DEVICE_AIR_VALVE;
    static const double USUAL_COEFFICIENT = 0.6;
    kent_air_valve *v = &f->model->air_valves[index];
    kent_record_copy(record, "id", NULL, v->id, sizeof v->id);
    v->point = kent_record_field(record, "at")->index;
    v->next_to = kent_record_field(record, "next_to")->index;
    v->admission_orifice = kent_record_number(record, "admission_orifice");
    v->release_orifice = kent_record_number(record, "release_orifice");
    v->admission_coefficient =
        kent_fill_usual(f, record, KIND, "admission_coefficient", USUAL_COEFFICIENT,
                        "not given: usual of a sharp orifice");
    v->release_coefficient =
        kent_fill_usual(f, record, KIND, "release_coefficient", USUAL_COEFFICIENT,
                        "not given: usual of a sharp orifice");
    v->switch_pressure = kent_record_number(record, "switch_pressure");
    v->switched_orifice = kent_record_number(record, "switched_orifice");
    v->node = -1;
    v->place = record->place;
    const double units = kent_record_number_or(record, "in_parallel", 1.0);
    if (!record->sound) return;
    v->in_parallel = (int)units;
    if (!f->knows_temperature) { /* which the air has too */
        kent_fill_assume_value(f, "water temperature", f->model->water.temperature,
                               KENT_TEMPERATURE, "no temperature given");
    }
    if (isnan(v->switch_pressure) != isnan(v->switched_orifice)) {
        kent_record_complain(
            &f->reader, record,
            isnan(v->switched_orifice) ? "switch_pressure" : "switched_orifice",
            "switch_pressure and switched_orifice stand together: give both, or "
            "neither for a valve that does not switch");
    } else if (v->switched_orifice >= v->release_orifice) {
        kent_record_complain(&f->reader, record, "switched_orifice",
                             "switched_orifice is not smaller than release_orifice");
    }
}
