/* Pull along pipes in results.json: ends of strings, legs behind restrained joints,
 * steep stretches. */
#include "kent_json.h"

#include <math.h>

static const double DEGREES = 180.0 / 3.14159265358979323846;

static const char *end_word(kent_string_end_kind kind)
{
    switch (kind) {
    case KENT_STRING_TO_JOINTS:
        return "slipping-joints";
    case KENT_STRING_TO_RESTRAINED:
        return "restrained-joints";
    case KENT_STRING_TO_WALL:
        return "wall";
    case KENT_STRING_TO_DEVICE:
        return "device";
    case KENT_STRING_TO_OPEN:
        return "open";
    case KENT_STRING_CLOSED:
        return "closed";
    }
    return "";
}

static json_t *pipe_of_span(const kent_model *m, int span)
{
    return span >= 0 ? kent_json_words(m->pipes[m->spans[span].pipe].id) : json_null();
}

static void set_case(kent_object *o, const kent_string_end *e, const kent_pull_end *p)
{
    const bool any = p->known && e->case_count > 0;
    const kent_string_case *c = any ? &e->cases[p->governing] : NULL;

    kent_object_set(o, "load_case", c ? kent_json_words(c->title.s) : json_null());
    kent_object_set(o, "time_s", kent_json_real(c ? c->time : NAN));
    kent_object_set(o, "pressure_Pa", kent_json_real(c ? c->pressure : NAN));
    kent_object_set(o, "safety_factor", kent_json_real(c ? c->safety_factor : NAN));
    kent_object_set(o, "of_pressure_N", kent_json_real(c ? p->of_pressure : NAN));
    kent_object_set(o, "of_pressure_by_mean_diameter_N",
                    kent_json_real(c ? p->of_pressure_mean : NAN));
    kent_object_set(o, "of_end_face_N", kent_json_real(c ? p->of_end_face : NAN));
    kent_object_set(o, "of_cooling_N", kent_json_real(c ? p->of_cooling : NAN));
    kent_object_set(o, "of_string_N", kent_json_real(c ? p->of_string : NAN));
    kent_object_set(o, "modulus_Pa", kent_json_real(c ? p->modulus : NAN));
    kent_object_set(o, "pull_N", kent_json_real(c ? p->pull : NAN));
    kent_object_set(o, "design_pull_N", kent_json_real(c ? p->factored : NAN));
}

static json_t *end_of(const kent_results *r, const kent_pull_end *p)
{
    const kent_model *m = r->model;
    const kent_strings *strings = &r->loads->strings;
    const kent_string_end *e = &strings->ends[p->end];
    const bool moves = !isnan(p->movement);
    kent_object o = kent_object_new();

    kent_object_set(&o, "at", kent_json_words(m->points[e->point].id));
    kent_object_set(&o, "pipe", pipe_of_span(m, e->span));
    kent_object_set(&o, "beyond", pipe_of_span(m, e->beyond));
    kent_object_set(&o, "end", kent_json_words(end_word(e->kind)));
    kent_object_set(&o, "string", kent_json_count((size_t)e->string));
    kent_object_set(&o, "string_length_m", kent_json_real(strings->length[e->string]));
    set_case(&o, e, p);
    kent_object_set(&o, "friction_N_per_m", kent_json_real(p->friction));
    kent_object_set(&o, "development_length_m", kent_json_real(p->development));
    kent_object_set(&o, "longer_than_twice_that", json_boolean(p->bounded));
    kent_object_set(&o, "free_movement_m", kent_json_real(p->movement));
    kent_object_set(&o, "free_movement_case",
                    moves ? kent_json_words(e->cases[p->moves].title.s) : json_null());
    kent_object_set(&o, "restrained_beyond_m", kent_json_real(p->beyond_length));
    kent_object_set(&o, "restrained_beyond_pipes",
                    p->beyond_pipes > 0 ? json_integer(p->beyond_pipes) : json_null());
    kent_object_set(&o, "held_by",
                    p->known ? kent_json_words(kent_pull_holder_word(p->holder))
                             : json_null());
    kent_object_set(&o, "cautions", kent_json_notes(&p->cautions));
    return kent_object_done(o);
}

static json_t *leg_of(const kent_model *m, const kent_pull_leg *leg)
{
    const kent_fitting *f = &m->fittings[leg->fitting];
    const kent_port *port = &m->ports[f->port_first + leg->port];
    kent_object o = kent_object_new();

    kent_object_set(&o, "fitting", kent_json_words(f->id));
    kent_object_set(&o, "pipe", pipe_of_span(m, port->span));
    kent_object_set(&o, "toward",
                    port->toward >= 0 ? kent_json_words(m->points[port->toward].id)
                                      : json_null());
    kent_object_set(&o, "pull_N", kent_json_real(leg->pull));
    kent_object_set(&o, "stress_Pa", kent_json_real(leg->stress));
    return kent_object_done(o);
}

static json_t *steep_of(const kent_model *m, const kent_steep *s)
{
    kent_object o = kent_object_new();

    kent_object_set(&o, "pipe", kent_json_words(m->pipes[s->pipe].id));
    kent_object_set(&o, "station_from_m", kent_json_real(s->from));
    kent_object_set(&o, "station_to_m", kent_json_real(s->to));
    kent_object_set(&o, "length_m", kent_json_real(s->end - s->start));
    kent_object_set(&o, "slope", kent_json_real(s->slope));
    kent_object_set(&o, "angle_deg", kent_json_real(s->angle * DEGREES));
    kent_object_set(&o, "weight_N_per_m", kent_json_real(s->weight));
    kent_object_set(&o, "along_N_per_m", kent_json_real(s->along));
    kent_object_set(&o, "friction_N_per_m", kent_json_real(s->friction));
    kent_object_set(&o, "left_by_friction_N_per_m", kent_json_real(s->net));
    kent_object_set(&o, "safety_factor", kent_json_real(s->factor));
    kent_object_set(&o, "anchors", json_integer(s->anchors));
    kent_object_set(&o, "spacing_m", kent_json_real(s->spacing));
    kent_object_set(&o, "anchor_N",
                    kent_json_real(s->anchors > 0 ? s->anchor_force : NAN));
    kent_object_set(&o, "hangs_on_upper_end_N", kent_json_real(s->hangs));
    kent_object_set(&o, "cautions", kent_json_notes(&s->cautions));
    return kent_object_done(o);
}

void kent_json_put_pulls(kent_writer *w)
{
    const kent_pulls *p = &w->results->restraints->pulls;

    if (p->end_count + p->leg_count + p->steep_count == 0) {
        kent_json_put_text(w, ",\n\"pulls\": null");
        return;
    }
    kent_json_open_list(w, ",\n\"pulls\": {\"ends\": [");
    for (size_t i = 0; i < p->end_count; i++) {
        kent_json_put_element(w, end_of(w->results, &p->ends[i]));
    }
    kent_json_open_list(w, "], \"legs\": [");
    for (size_t i = 0; i < p->leg_count; i++) {
        kent_json_put_element(w, leg_of(w->model, &p->legs[i]));
    }
    kent_json_open_list(w, "], \"steep\": [");
    for (size_t i = 0; i < p->steep_count; i++) {
        kent_json_put_element(w, steep_of(w->model, &p->steeps[i]));
    }
    kent_json_put_text(w, "]}");
}
