/* What was built and what it reaches, for results.json and by itself. */
#include "kent_json.h"
#include "kent_shown.h"

#include <math.h>

static json_t *reach_of(const kent_model *m, const kent_fitting *f,
                        const kent_fitting_loads *loads, const kent_built_reach *reach)
{
    kent_object o = kent_object_new();
    const int toward =
        reach->port >= 0 ? m->ports[f->port_first + (size_t)reach->port].toward : -1;
    kent_object_set(&o, "part", kent_json_words(reach->port < 0 ? "block" : "leg"));
    kent_object_set(&o, "towards",
                    toward >= 0 ? kent_json_words(m->points[toward].id) : json_null());
    kent_object_set(
        &o, "sense",
        kent_json_words(reach->port < 0 ? kent_shown_sense(reach->sense) : "whole"));
    kent_object_set(&o, "load_case",
                    kent_json_words(loads->cases[reach->load_case].title.s));
    kent_object_set(&o, "load_N", kent_json_real(reach->load));
    kent_object_set(&o, "resistance_N", kent_json_real(reach->resistance));
    kent_object_set(&o, "factor_reached", kent_json_real(reach->reached));
    kent_object_set(&o, "safety_factor", kent_json_real(reach->asked));
    kent_object_set(&o, "utilisation", kent_json_real(reach->utilisation));
    return kent_object_done(o);
}

json_t *kent_json_built(const kent_results *r, size_t fitting)
{
    const kent_model *m = r->model;
    const kent_as_built *b = &r->restraints->fittings[fitting].as_built;
    const kent_fitting_loads *loads = &r->loads->fittings[fitting];
    const kent_built_reach *worst = b->worst >= 0 ? &b->reaches[b->worst] : NULL;
    if (!b->stated) return json_null();
    kent_object o = kent_object_new();
    kent_object list = kent_list_new();
    for (size_t i = 0; i < b->count; i++) {
        kent_list_append(&list,
                         reach_of(m, &m->fittings[fitting], loads, &b->reaches[i]));
    }
    kent_object_set(&o, "factor_reached", kent_json_real(worst ? worst->reached : NAN));
    kent_object_set(&o, "safety_factor", kent_json_real(worst ? worst->asked : NAN));
    kent_object_set(&o, "utilisation",
                    kent_json_real(worst ? worst->utilisation : NAN));
    kent_object_set(&o, "governs",
                    worst ? reach_of(m, &m->fittings[fitting], loads, worst)
                          : json_null());
    kent_object_set(&o, "less_than_asked", b->falls_short ? json_true() : json_false());
    kent_object_set(&o, "volume_m3", kent_json_real(b->volume));
    kent_object_set(&o, "reaches", kent_object_done(list));
    kent_object_set(&o, "broken", kent_json_notes(&b->broken));
    return kent_object_done(o);
}

kent_status kent_report_built_json(const kent_results *r, const int *fittings,
                                   size_t count, kent_sink sink)
{
    kent_writer w = {.results = r, .model = r->model, .sink = sink};
    kent_json_put_text(&w,
                       "{\"format\": 1,\n\"program\": \"kentledge\",\n\"version\": ");
    kent_json_put(&w, kent_json_words(KENT_VERSION));
    kent_json_put_text(&w, ",\n\"title\": ");
    kent_json_put(&w, kent_json_words(r->model->title));
    kent_json_open_list(&w, ",\n\"fittings\": [");
    for (size_t i = 0; i < count; i++) {
        kent_object o = kent_object_new();
        const size_t at = (size_t)fittings[i];
        kent_object_set(&o, "id", kent_json_words(r->model->fittings[at].id));
        kent_object_set(&o, "as_built", kent_json_built(r, at));
        kent_json_put_element(&w, kent_object_done(o));
    }
    kent_json_put_text(&w, "]}\n");
    return w.status;
}
