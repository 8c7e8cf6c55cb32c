/* Restrained lengths, leg by leg. */
#include "kent_json.h"

static json_t *leg_of(const kent_model *m, const kent_fitting *f, const kent_leg *leg)
{
    const kent_port *port = &m->ports[f->port_first + leg->port];
    const int end = leg->end_point;
    kent_object o = kent_object_new();

    kent_object_set(&o, "direction", kent_json_vector(port->direction));
    kent_object_set(&o, "toward",
                    port->toward >= 0 ? kent_json_words(m->points[port->toward].id)
                                      : json_null());
    kent_object_set(&o, "length_m", kent_json_real(leg->length));
    kent_object_set(&o, "form", kent_json_words(kent_length_form_word(leg->form)));
    kent_object_set(&o, "length_handbook_m",
                    kent_json_real(leg->by_form[KENT_FORM_HANDBOOK]));
    kent_object_set(&o, "length_etl_m", kent_json_real(leg->by_form[KENT_FORM_ETL]));
    kent_object_set(&o, "pull_N", kent_json_real(leg->pull));
    kent_object_set(&o, "demand_N", kent_json_real(leg->demand));
    kent_object_set(&o, "bears", json_boolean(leg->bears));
    kent_object_set(&o, "run_takes_N", kent_json_real(leg->credit));
    kent_object_set(&o, "pipes",
                    leg->pipes > 0 ? json_integer(leg->pipes) : json_null());
    kent_object_set(&o, "joints", /* the fitting's own, and between its pipes */
                    leg->pipes > 0 ? json_integer(leg->pipes) : json_null());
    kent_object_set(&o, "restrained_m", kent_json_real(leg->reach));
    kent_object_set(&o, "fits", json_boolean(leg->fits));
    kent_object_set(&o, "ends_in", kent_json_words(kent_leg_end_word(leg->end)));
    kent_object_set(&o, "ends_at",
                    end >= 0 ? kent_json_words(m->points[end].id) : json_null());
    kent_object_set(&o, "lengthened", json_boolean(leg->lengthened));
    kent_object_set(&o, "structure_pull_N", kent_json_real(leg->structure_pull));
    return kent_object_done(o);
}

json_t *kent_json_legs(const kent_model *m, const kent_fitting *f,
                       const kent_holding *h)
{
    kent_object list = kent_list_new();

    for (size_t i = 0; i < h->leg_count; i++) {
        kent_list_append(&list, leg_of(m, f, &h->legs[i]));
    }
    return kent_object_done(list);
}
