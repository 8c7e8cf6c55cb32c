/* Restrained lengths that meet, as systems: the main's schedule of restrained pipe. */
#include "kent_json.h"

static json_t *fittings_of(const kent_model *m, const kent_systems *s,
                           const kent_system_of *system)
{
    kent_object list = kent_list_new();

    for (size_t i = 0; i < system->fitting_count; i++) {
        const size_t fitting = s->fittings[system->fitting_first + i];
        kent_list_append(&list, kent_json_words(m->fittings[fitting].id));
    }
    return kent_object_done(list);
}

static json_t *joints_of(int joints)
{
    return joints > 0 ? json_integer(joints) : json_null();
}

static json_t *stretches_of(const kent_model *m, const kent_systems *s,
                            const kent_system_of *system)
{
    kent_object list = kent_list_new();

    for (size_t i = 0; i < system->stretch_count; i++) {
        const kent_stretch *k = &s->stretches[system->stretch_first + i];
        kent_object o = kent_object_new();
        kent_object_set(&o, "pipe", kent_json_words(m->pipes[k->pipe].id));
        kent_object_set(&o, "from_m", kent_json_real(k->from));
        kent_object_set(&o, "to_m", kent_json_real(k->to));
        kent_object_set(&o, "station_from_m", kent_json_real(k->station_from));
        kent_object_set(&o, "station_to_m", kent_json_real(k->station_to));
        kent_object_set(&o, "joints", joints_of(k->joints));
        kent_list_append(&list, kent_object_done(o));
    }
    return kent_object_done(list);
}

static json_t *outers_of(const kent_model *m, const kent_systems *s,
                         const kent_system_of *system)
{
    kent_object list = kent_list_new();

    for (size_t i = 0; i < system->outer_count; i++) {
        const kent_outer *leg = &s->outers[system->outer_first + i];
        const kent_fitting *f = &m->fittings[leg->fitting];
        const int toward = m->ports[f->port_first + leg->port].toward;
        kent_object o = kent_object_new();
        kent_object_set(&o, "fitting", kent_json_words(f->id));
        kent_object_set(&o, "toward",
                        toward >= 0 ? kent_json_words(m->points[toward].id)
                                    : json_null());
        kent_object_set(&o, "length_m", kent_json_real(leg->length));
        kent_object_set(&o, "needed_N", kent_json_real(leg->needed));
        kent_object_set(&o, "given_N", kent_json_real(leg->given));
        kent_object_set(&o, "fits", json_boolean(leg->fits));
        kent_list_append(&list, kent_object_done(o));
    }
    return kent_object_done(list);
}

static json_t *system_of(const kent_model *m, const kent_systems *s, size_t index)
{
    const kent_system_of *system = &s->at[index];
    const size_t first = s->fittings[system->fitting_first];
    kent_object o = kent_object_new();

    kent_object_set(&o, "id", kent_json_words(m->fittings[first].id));
    kent_object_set(&o, "number", kent_json_count(index + 1));
    kent_object_set(&o, "fittings", fittings_of(m, s, system));
    kent_object_set(&o, "stretches", stretches_of(m, s, system));
    kent_object_set(&o, "legs_out", outers_of(m, s, system));
    kent_object_set(&o, "length_m", kent_json_real(system->length));
    kent_object_set(&o, "joints", joints_of(system->joints));
    kent_object_set(&o, "needed_N", kent_json_real(system->needed));
    kent_object_set(&o, "given_N", kent_json_real(system->given));
    kent_object_set(&o, "fits", json_boolean(system->fits));
    kent_object_set(&o, "across", json_boolean(system->across));
    kent_object_set(&o, "vertical_offset", json_boolean(system->offset));
    kent_object_set(&o, "lengthened", json_boolean(system->lengthened));
    return kent_object_done(o);
}

void kent_json_put_systems(kent_writer *w)
{
    const kent_systems *s = &w->results->restraints->systems;

    kent_json_open_list(w, ",\n\"restrained_systems\": [");
    for (size_t i = 0; i < s->count; i++) {
        kent_json_put_element(w, system_of(w->model, s, i));
    }
    kent_json_put_text(w, "]");
}
