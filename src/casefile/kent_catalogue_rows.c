/* Materials, types of valve, soils and concretes: one row each. */
#include "kent_catalogue_internal.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

kent_provenance kent_record_provenance(const kent_record *record)
{
    kent_provenance from;
    kent_record_copy(record, "source", NULL, from.source, sizeof from.source);
    kent_record_copy(record, "status", NULL, from.status, sizeof from.status);
    return from;
}

/* "source (status)", for structs with one field for both. */
static void source_with_status(const kent_record *record, char *out, size_t size)
{
    const kent_provenance from = kent_record_provenance(record);
    (void)snprintf(out, size, "%.160s (%s)", from.source, from.status);
}

/* ---- materials ------------------------------------------------------------------- */

static void read_derating(kent_reader *r, kent_record *record, kent_material *m)
{
    double temperature[KENT_DERATING_ROWS];
    double factor[KENT_DERATING_ROWS];
    const char *key = "derating";
    if (!kent_record_has(record, key)) return;
    const size_t count = kent_record_pairs(r, record, key, KENT_TEMPERATURE, KENT_RATIO,
                                           KENT_DERATING_ROWS, temperature, factor);
    for (size_t i = 0; i < count; i++) {
        const bool rises = i == 0 || temperature[i] > temperature[i - 1];
        const bool falls = factor[i] <= (i == 0 ? 1.0 : factor[i - 1]);
        if (!rises || !falls || !(factor[i] > 0.0)) {
            kent_record_complain(r, record, key,
                                 "pair %zu of derating: temperatures must rise, shares "
                                 "be above 0 and fall from 1.0 on",
                                 i + 1);
            return;
        }
        m->derating[i] = (kent_derating){temperature[i], factor[i]};
    }
    m->derating_count = count;
}

void kent_catalogue_add_material(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    kent_material *m =
        kent_catalogue_grown(r, (void **)&c->materials, &c->material_count, sizeof *m);
    if (!m) return;
    *m = (kent_material){
        .modulus = kent_record_number(record, "elastic_modulus"),
        .poisson = kent_record_number(record, "poisson_ratio"),
        .density = kent_record_number(record, "density"),
        .roughness = kent_record_number(record, "roughness"),
        .expansion = kent_record_number(record, "expansion"),
        .long_modulus = kent_record_number(record, "long_modulus"),
        .lining_modulus = kent_record_number_or(record, "lining_modulus", 0.0),
        .creep_temperature = kent_record_number(record, "creep_temperature"),
        .plastic = kent_record_switch(record, "plastic", false),
        .from = kent_record_provenance(record)};
    kent_record_copy(record, "id", NULL, m->id, sizeof m->id);
    m->creep_count = kent_record_creep(r, record, m->creep);
    read_derating(r, record, m);
    if (!m->plastic && m->creep_count + m->derating_count > 0) {
        kent_record_complain(r, record, NULL,
                             "creep and derating are of a plastic; say plastic = true");
    }
}

double kent_material_derating(const kent_material *material, double temperature)
{
    const kent_derating *d = material->derating;
    const size_t count = material->derating_count;
    size_t i = 0;
    if (count == 0) return 1.0;
    if (!(temperature <= d[count - 1].temperature)) return NAN;
    while (d[i].temperature < temperature) {
        i++;
    }
    if (i == 0) return temperature < d[0].temperature ? 1.0 : d[0].factor;
    const double share = (temperature - d[i - 1].temperature) /
                         (d[i].temperature - d[i - 1].temperature);
    return d[i - 1].factor + share * (d[i].factor - d[i - 1].factor);
}

/* ---- valves, soils, concretes ---------------------------------------------------- */

void kent_catalogue_add_valve(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    kent_valve_type *v =
        kent_catalogue_grown(r, (void **)&c->valves, &c->valve_count, sizeof *v);
    if (!v) return;
    *v = (kent_valve_type){.loss = kent_record_number(record, "loss"),
                           .from = kent_record_provenance(record)};
    kent_record_copy(record, "id", NULL, v->id, sizeof v->id);
    if (kent_record_has(record, "characteristic")) {
        (void)kent_record_curve(r, record, &v->curve);
    } else if (isnan(v->loss)) {
        kent_record_complain(r, record, NULL,
                             "nothing is said of what it passes; give characteristic, "
                             "loss, or both");
    }
}

void kent_catalogue_add_soil(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    kent_soil *s =
        kent_catalogue_grown(r, (void **)&c->soils, &c->soil_count, sizeof *s);
    if (!s) return;
    *s = kent_soil_blank();
    kent_record_copy(record, "id", NULL, s->id, sizeof s->id);
    kent_record_soil(r, record, s);
    source_with_status(record, s->source, sizeof s->source);
    if (record->sound && !kent_soil_has_bearing(s)) {
        kent_record_complain(r, record, NULL,
                             "its bearing is missing; give allowable_bearing, "
                             "bearing_by_depth, bearing_gradient or passive_share");
    }
}

void kent_catalogue_add_concrete(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    kent_concrete *row = kent_catalogue_grown(r, (void **)&c->concretes,
                                              &c->concrete_count, sizeof *row);
    if (!row) return;
    *row = (kent_concrete){.strength = kent_record_number(record, "strength")};
    kent_record_copy(record, "id", NULL, row->id, sizeof row->id);
    source_with_status(record, row->source, sizeof row->source);
}
