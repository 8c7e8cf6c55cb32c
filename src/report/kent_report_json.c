/* results.json: SI, full precision, written element by element so that a large main
 * needs no tree of its own in memory. A value that is not there is null. */
#include "kent_pressures.h"
#include "kent_shown.h"
#include "kent_sink.h"

#include <jansson.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* Of one march; the rest is counted. */
enum { CAVITIES_LISTED = 100 };

static const double DEGREES = 57.29577951308232; /* per radian */

/* ---- writing --------------------------------------------------------------------- */

typedef struct kent_writer {
    const kent_results *results;
    const kent_model *model;
    kent_sink sink;
    kent_status status; /* the first failure; after it nothing more is written */
    bool listed;        /* an element of the open list stands already */
} kent_writer;

static void put_text(kent_writer *w, const char *text)
{
    if (w->status) return;
    if (w->sink.write(w->sink.to, text, strlen(text)) != 0) w->status = KENT_E_IO;
}

static int dump_piece(const char *buffer, size_t size, void *data)
{
    const kent_writer *w = data;
    return w->sink.write(w->sink.to, buffer, size);
}

/* Writes and lets go of value; NULL: it could not be made. */
static void put_value(kent_writer *w, json_t *value)
{
    const size_t flags = JSON_REAL_PRECISION(17) | JSON_ENCODE_ANY;
    if (!w->status && !value) w->status = KENT_E_NOMEM;
    if (!w->status && json_dump_callback(value, dump_piece, w, flags) != 0) {
        w->status = KENT_E_IO;
    }
    json_decref(value);
}

static void open_list(kent_writer *w, const char *head)
{
    put_text(w, head);
    w->listed = false;
}

static void put_element(kent_writer *w, json_t *value)
{
    put_text(w, w->listed ? ",\n" : "\n");
    put_value(w, value);
    w->listed = true;
}

/* ---- values ---------------------------------------------------------------------- */

static json_t *real(double value)
{
    return isfinite(value) ? json_real(value) : json_null();
}

static json_t *count_of(size_t value) { return json_integer((json_int_t)value); }

/* Text of a case need not be UTF-8: then its bytes beyond ASCII become '?'. */
static json_t *words(const char *text)
{
    json_t *value = json_string(text);
    if (value) return value;
    char *plain = kent_copy_text(text);
    if (!plain) return NULL;
    for (char *s = plain; *s != '\0'; s++) {
        if ((unsigned char)*s >= 0x80) *s = '?';
    }
    value = json_string(plain);
    free(plain);
    return value;
}

/* An object under construction; made false by the first value that could not be. */
typedef struct kent_object {
    json_t *json;
    bool ok;
} kent_object;

static kent_object object_new(void)
{
    json_t *json = json_object();
    return (kent_object){json, json != NULL};
}

/* Keeps value, even where it fails. */
static void set(kent_object *o, const char *key, json_t *value)
{
    if (json_object_set_new(o->json, key, value) != 0) o->ok = false;
}

static json_t *object_done(kent_object o)
{
    if (o.ok) return o.json;
    json_decref(o.json);
    return NULL;
}

static kent_object list_new(void)
{
    json_t *json = json_array();
    return (kent_object){json, json != NULL};
}

static void append(kent_object *list, json_t *value)
{
    if (json_array_append_new(list->json, value) != 0) list->ok = false;
}

/* [x, y, z]; null where it is not known. */
static json_t *vector(kent_vec3 v)
{
    if (!isfinite(kent_vec3_length(v))) return json_null();
    kent_object list = list_new();
    append(&list, real(v.x));
    append(&list, real(v.y));
    append(&list, real(v.z));
    return object_done(list);
}

static json_t *notes_of(const kent_notes *notes)
{
    kent_object list = list_new();
    for (size_t i = 0; i < notes->count; i++) {
        append(&list, words(notes->text[i]));
    }
    return object_done(list);
}

/* ---- the head -------------------------------------------------------------------- */

static json_t *water_of(const kent_water *water)
{
    kent_object o = object_new();
    set(&o, "density_kgm3", real(water->density));
    set(&o, "bulk_modulus_Pa", real(water->bulk_modulus));
    set(&o, "viscosity_Pas", real(water->viscosity));
    set(&o, "vapour_pressure_Pa", real(water->vapour_pressure));
    set(&o, "sound_speed_ms", real(water->sound_speed));
    return object_done(o);
}

static void put_head(kent_writer *w)
{
    char checksum[20];
    (void)snprintf(checksum, sizeof checksum, "%016llx", w->model->checksum);
    put_text(w, "{\"format\": 1,\n\"program\": \"kentledge\",\n\"version\": ");
    put_value(w, words(KENT_VERSION));
    put_text(w, ",\n\"title\": ");
    put_value(w, words(w->model->title));
    put_text(w, ",\n\"case_checksum\": ");
    put_value(w, words(checksum));
    put_text(w, ",\n\"water\": ");
    put_value(w, water_of(&w->model->water));
}

/* ---- steady ---------------------------------------------------------------------- */

static json_t *steady_point(const kent_model *m, size_t point, double head)
{
    const kent_point *p = &m->points[point];
    kent_object o = object_new();
    set(&o, "id", words(p->id));
    set(&o, "head_m", real(head));
    set(&o, "pressure_Pa", real(kent_model_pressure(m, head, p->at.z)));
    return object_done(o);
}

static json_t *steady_pipe(const kent_results *r, const kent_steady *s, size_t index)
{
    const kent_span *span = &r->model->spans[index];
    const double flow = s->span_flow[index];
    const kent_grid *grid = r->scenario_count > 0 ? r->scenarios[0].grid : NULL;
    kent_object o = object_new();
    set(&o, "id", words(span->id));
    set(&o, "flow_m3s", real(flow));
    set(&o, "velocity_ms", real(flow / span->area));
    set(&o, "wave_speed_ms", real(span->wave_speed));
    set(&o, "wave_speed_used_ms", real(grid ? grid->wave_speed_used[index] : NAN));
    set(&o, "reaches", grid ? json_integer(grid->reaches[index]) : json_null());
    return object_done(o);
}

/* A pump's row holds its duty too. */
static json_t *steady_device(const kent_model *m, const kent_steady *s, size_t index)
{
    const kent_device *d = &m->devices[index];
    kent_object o = object_new();
    set(&o, "id", words(d->id));
    set(&o, "kind", words(kent_device_word(d->kind)));
    set(&o, "flow_m3s", real(s->device_flow[index]));
    if (d->kind == KENT_DEVICE_PUMP) {
        const kent_pump_duty duty = kent_steady_pump(s, index);
        set(&o, "running", json_integer(duty.running));
        set(&o, "lift_m", real(duty.lift));
        set(&o, "power_W", real(duty.power));
    }
    return object_done(o);
}

/* head: room for the points' heads. */
static void put_state(kent_writer *w, size_t state, double *head)
{
    const kent_model *m = w->model;
    const kent_steady *s = w->results->steadies[state];
    kent_point_steady_heads(m, s, head);
    put_text(w, state > 0 ? ",\n{\"state\": " : "\n{\"state\": ");
    put_value(w, words(m->states[state].id));
    open_list(w, ", \"points\": [");
    for (size_t i = 0; i < m->point_count; i++) {
        put_element(w, steady_point(m, i, head[i]));
    }
    open_list(w, "],\n\"pipes\": [");
    for (size_t i = 0; i < m->span_count; i++) {
        put_element(w, steady_pipe(w->results, s, i));
    }
    open_list(w, "],\n\"devices\": [");
    for (size_t i = 0; i < m->device_count; i++) {
        put_element(w, steady_device(m, s, i));
    }
    put_text(w, "]}");
}

static void put_steady(kent_writer *w)
{
    const kent_model *m = w->model;
    double *head = kent_alloc(m->point_count, sizeof *head);
    if (!head) {
        w->status = KENT_E_NOMEM;
        return;
    }
    put_text(w, ",\n\"steady\": [");
    for (size_t i = 0; m->span_count > 0 && i < w->results->steady_count; i++) {
        put_state(w, i, head);
    }
    put_text(w, "]");
    free(head);
}

/* ---- scenarios ------------------------------------------------------------------- */

static json_t *scenario_point(const kent_model *m, size_t point,
                              const kent_scenario_result *s)
{
    const kent_point *p = &m->points[point];
    const kent_peak *peak = &s->points[point];
    const double z = p->at.z;
    kent_object o = object_new();
    set(&o, "id", words(p->id));
    set(&o, "highest_head_m", real(peak->highest_head));
    set(&o, "highest_at_s", real(peak->highest_at));
    set(&o, "lowest_head_m", real(peak->lowest_head));
    set(&o, "lowest_at_s", real(peak->lowest_at));
    set(&o, "highest_pressure_Pa", real(kent_model_pressure(m, peak->highest_head, z)));
    set(&o, "lowest_pressure_Pa", real(kent_model_pressure(m, peak->lowest_head, z)));
    set(&o, "cavity_m3", s->hollow[point] > 0.0 ? real(s->hollow[point]) : json_null());
    set(&o, "below_vapour", json_boolean(s->touched[point]));
    return object_done(o);
}

static void set_swing(kent_object *o, const char *name, const kent_swing *e)
{
    kent_object of = object_new();
    set(&of, "highest", real(e->highest));
    set(&of, "highest_at_s", real(e->highest_at));
    set(&of, "lowest", real(e->lowest));
    set(&of, "lowest_at_s", real(e->lowest_at));
    set(o, name, object_done(of));
}

/* SI, the unit in each quantity's name. */
static json_t *scenario_device(const kent_model *m, size_t device,
                               const kent_scenario_result *s)
{
    const kent_device *d = &m->devices[device];
    const kent_device_extreme *of = &s->devices[device];
    const kent_device_quantity *q = kent_device_quantities(d->kind);
    kent_object o = object_new();
    set(&o, "id", words(kent_device_name(m, device).s));
    set(&o, "at", words(m->points[d->point].id));
    set(&o, "kind", words(kent_device_word(d->kind)));
    set(&o, "left_out", json_boolean(kent_device_is_left_out(m, device, s->scenario)));
    set_swing(&o, "flow_m3s", &of->flow);
    for (int j = 0; j < KENT_TOLD && q[j].name; j++) {
        set_swing(&o, q[j].name, &of->told[j]);
    }
    set(&o, "caution", of->caution ? words(of->caution) : json_null());
    return object_done(o);
}

/* Called after its point, or "A@12.5": the pipe and metres from its start. */
static json_t *scenario_cavity(const kent_model *m, const kent_cavity *c)
{
    kent_object o = object_new();
    char id[2 * KENT_ID];
    if (c->node >= 0) {
        (void)snprintf(id, sizeof id, "%s", m->points[m->nodes[c->node].point].id);
    } else {
        (void)snprintf(id, sizeof id, "%s@%.6g", m->spans[c->span].id, c->chainage);
    }
    set(&o, "id", words(id));
    set(&o, "pipe", c->span < 0 ? json_null() : words(m->spans[c->span].id));
    set(&o, "chainage_m", real(c->chainage));
    set(&o, "largest_m3", real(c->largest));
    set(&o, "largest_at_s", real(c->largest_at));
    set(&o, "opened_s", real(c->opened));
    set(&o, "first_closed_s", real(c->closed));
    set(&o, "last_closed_s", real(c->collapsed));
    set(&o, "times", count_of((size_t)c->count));
    set(&o, "pulse_m", real(c->pulse));
    return object_done(o);
}

/* How the pressure of the site test was found, and where it is read. */
static json_t *test_of(const kent_results *r)
{
    const kent_site_test *t = &r->loads->test;
    const bool none = t->rule == KENT_TEST_FIXED && isnan(t->pressure);
    if (none) return json_null();
    kent_object o = object_new();
    set(&o, "rule", words(kent_site_test_rule_word(t->rule)));
    set(&o, "gauge",
        t->gauge >= 0 ? words(r->model->points[t->gauge].id) : json_null());
    set(&o, "pressure_Pa", real(t->pressure));
    return object_done(o);
}

static void put_scenario(kent_writer *w, const kent_scenario_result *s)
{
    const kent_model *m = w->model;
    put_text(w, "\n{\"id\": ");
    put_value(w, words(m->scenarios[s->scenario].id));
    put_text(w, ", \"state\": ");
    put_value(w, words(m->states[s->state].id));
    put_text(w, ", \"time_step_s\": ");
    put_value(w, real(s->step));
    put_text(w, ", \"time_steps\": ");
    put_value(w, count_of(s->steps));
    put_text(w, ", \"numerical_uncertainty_m\": ");
    put_value(w, real(s->uncertainty));
    put_text(w, ", \"grid_points_below_vapour\": ");
    put_value(w, count_of(s->below_vapour));
    open_list(w, ",\n\"points\": [");
    for (size_t i = 0; i < m->point_count; i++) {
        put_element(w, scenario_point(m, i, s));
    }
    put_text(w, "]");
    open_list(w, ",\n\"devices\": [");
    for (size_t i = 0; i < m->device_count; i++) {
        put_element(w, scenario_device(m, i, s));
    }
    put_text(w, "],\n\"cavity_places\": ");
    put_value(w, count_of(s->cavity_count));
    open_list(w, ",\n\"cavities\": [");
    for (size_t i = 0; i < s->cavity_count && i < CAVITIES_LISTED; i++) {
        put_element(w, scenario_cavity(m, &s->cavities[i]));
    }
    put_text(w, "]}");
}

static void put_scenarios(kent_writer *w)
{
    put_text(w, ",\n\"scenarios\": [");
    for (size_t i = 0; i < w->results->scenario_count; i++) {
        if (i > 0) put_text(w, ",");
        put_scenario(w, &w->results->scenarios[i]);
    }
    put_text(w, "]");
}

/* ---- fittings -------------------------------------------------------------------- */

/* null: of no state in particular. */
static json_t *state_of(const kent_model *m, const kent_load_case *c)
{
    return c && c->state >= 0 ? words(m->states[c->state].id) : json_null();
}

static json_t *case_of(const kent_model *m, const kent_load_case *c)
{
    const kent_instant *at = &c->worst[KENT_RESULTANT];
    const kent_vec3 thrust = at->set ? at->balance.thrust : (kent_vec3){NAN, NAN, NAN};
    kent_object o = object_new();
    set(&o, "name", words(c->name));
    set(&o, "state", state_of(m, c));
    set(&o, "time_s", real(at->set ? at->time : NAN));
    set(&o, "pressure_Pa", real(at->set ? at->pressure : NAN));
    set(&o, "thrust_N", vector(thrust));
    set(&o, "safety_factor", real(c->safety_factor));
    set(&o, "design_thrust_N", real(c->safety_factor * kent_vec3_length(thrust)));
    return object_done(o);
}

static json_t *face_of(const kent_block *b)
{
    if (!b->has_face) return json_null();
    kent_object o = object_new();
    set(&o, "width_m", real(b->face.width));
    set(&o, "height_m", real(b->face.height));
    set(&o, "thickness_m", real(b->face_thickness));
    set(&o, "volume_m3", real(b->face_volume));
    set(&o, "utilisation", real(b->face_utilisation));
    return object_done(o);
}

static json_t *block_of(const kent_holding *h)
{
    const kent_block *b = &h->block;
    const bool none = !h->held || b->type == KENT_BLOCK_NONE;
    kent_object o = object_new();
    set(&o, "type", words(kent_block_word(none ? KENT_BLOCK_NONE : b->type)));
    /* asked for, and told even where no block could be made of it */
    set(&o, "bearing_area_m2", real(b->bearing_area > 0.0 ? b->bearing_area : NAN));
    set(&o, "width_m", real(none ? NAN : b->width));
    set(&o, "height_m", real(none ? NAN : b->height));
    set(&o, "thickness_m", real(none ? NAN : b->thickness));
    set(&o, "volume_m3", real(none ? NAN : b->volume));
    set(&o, "allowable_bearing_Pa", real(h->allowable_bearing));
    set(&o, "bearing_pressure_Pa", real(none ? NAN : b->bearing_pressure));
    set(&o, "utilisation", real(none ? NAN : b->utilisation));
    set(&o, "face", none ? json_null() : face_of(b));
    return object_done(o);
}

/* The ports of the case that governs; without one the fitting's own. */
static json_t *ports_of(const kent_model *m, const kent_fitting *f,
                        const kent_fitting_loads *loads, const kent_holding *h)
{
    const kent_load_case none = {0};
    const kent_instant *at = kent_shown_instant(loads, h);
    kent_port ports[KENT_PORTS];
    const size_t count = kent_load_case_ports(
        m, f, h->governing >= 0 ? &loads->cases[h->governing] : &none, ports);
    kent_object list = list_new();
    for (size_t i = 0; i < count; i++) {
        const kent_port *port = &ports[i];
        const bool known = at && i < at->balance.port_count;
        const kent_port_state *state = known ? &at->balance.port[i] : NULL;
        kent_object o = object_new();
        set(&o, "direction", vector(port->direction));
        set(&o, "pressure_Pa", real(state ? state->pressure : NAN));
        set(&o, "flow_m3s", real(state ? state->flow : NAN));
        set(&o, "push_N", real(state ? state->push : NAN));
        set(&o, "seal_diameter_m", real(port->seal_diameter));
        append(&list, object_done(o));
    }
    return object_done(list);
}

static json_t *legs_of(const kent_model *m, const kent_fitting *f,
                       const kent_holding *h)
{
    kent_object list = list_new();
    for (size_t i = 0; i < h->leg_count; i++) {
        const kent_leg *leg = &h->legs[i];
        const kent_port *port = &m->ports[f->port_first + leg->port];
        kent_object o = object_new();
        set(&o, "direction", vector(port->direction));
        set(&o, "length_m", real(leg->length));
        set(&o, "pipes", leg->pipes > 0 ? json_integer(leg->pipes) : json_null());
        set(&o, "fits", json_boolean(leg->fits));
        append(&list, object_done(o));
    }
    return object_done(list);
}

/* Of the governing case; of a case of no state in particular the only one there is. */
static json_t *state_governing(const kent_results *r, size_t index,
                               const kent_load_case *c)
{
    const kent_model *m = r->model;
    const bool network = m->fittings[index].point >= 0 && m->span_count > 0;
    if (network && m->state_count == 1) return words(m->states[0].id);
    return state_of(m, c);
}

/* What governs and by how much. */
static void set_governing(kent_object *o, const kent_results *r, size_t index)
{
    const kent_model *m = r->model;
    const kent_fitting_loads *loads = &r->loads->fittings[index];
    const kent_holding *h = &r->restraints->fittings[index];
    const kent_instant *at = kent_shown_instant(loads, h);
    const kent_load_case *c = at ? &loads->cases[h->governing] : NULL;
    const kent_vec3 thrust = at ? at->balance.thrust : (kent_vec3){NAN, NAN, NAN};
    set(o, "load_case", c ? words(c->name) : json_null());
    set(o, "sense", c ? words(kent_shown_sense(h->sense)) : json_null());
    set(o, "state", state_governing(r, index, c));
    set(o, "scenario",
        c && c->scenario >= 0 ? words(m->scenarios[c->scenario].id) : json_null());
    set(o, "time_s", real(at ? at->time : NAN));
    set(o, "pressure_Pa", real(at ? at->pressure : NAN));
    set(o, "thrust_N", vector(thrust));
    set(o, "resultant_thrust_N", real(kent_vec3_length(thrust)));
    set(o, "horizontal_N", real(at ? kent_thrust_horizontal(thrust) : NAN));
    set(o, "vertical_N", real(thrust.z));
    set(o, "safety_factor", real(h->factor_asked));
    set(o, "design_thrust_N", real(at ? h->design_thrust : NAN));
    set(o, "factor_reached", real(h->factor_reached));
}

/* The pipe that a fitting's station counts along, by its id in the case. */
static json_t *pipe_of(const kent_model *m, const kent_fitting *f)
{
    const int span = f->port_count > 0 ? m->ports[f->port_first].span : -1;
    return span >= 0 ? words(m->pipes[m->spans[span].pipe].id) : json_null();
}

/* null: none, or a pipe leaves there. */
static json_t *branch_of(const kent_branch *b)
{
    if (b->end == KENT_BRANCH_NONE) return json_null();
    kent_object o = object_new();
    set(&o, "direction", vector(b->direction));
    set(&o, "outside_diameter_m", real(b->outside_diameter));
    set(&o, "inside_diameter_m", real(b->inside_diameter));
    set(&o, "joint", words(kent_joint_word(b->joint)));
    set(&o, "end", words(kent_branch_end_word(b->end)));
    return object_done(o);
}

static json_t *curve_of(const kent_fitting *f)
{
    if (f->type != KENT_CURVE) return json_null();
    kent_object o = object_new();
    set(&o, "radius_m", real(f->curve_radius));
    set(&o, "length_m", real(f->curve_length));
    return object_done(o);
}

/* Points whose fittings are told as one. */
static json_t *members_of(const kent_model *m, const kent_fitting *f)
{
    kent_object list = list_new();
    for (size_t i = 0; i < f->member_count; i++) {
        append(&list, words(m->points[m->members[f->member_first + i]].id));
    }
    return object_done(list);
}

static json_t *fitting_of(const kent_results *r, size_t index)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[index];
    const kent_fitting_loads *loads = &r->loads->fittings[index];
    const kent_holding *h = &r->restraints->fittings[index];
    kent_object cases = list_new();
    kent_object o = object_new();
    set(&o, "id", words(f->id));
    set(&o, "at", f->point >= 0 ? words(m->points[f->point].id) : json_null());
    set(&o, "pipe", pipe_of(m, f));
    set(&o, "type", words(kent_fitting_type_word(f->type)));
    set(&o, "role",
        f->role != KENT_ROLE_NONE ? words(kent_role_word(f->role)) : json_null());
    set(&o, "branch", branch_of(&f->branch));
    set(&o, "members", members_of(m, f));
    set(&o, "curve", curve_of(f));
    set(&o, "angle_deg", real(f->angle * DEGREES));
    set(&o, "station_m", real(f->station));
    set_governing(&o, r, index);
    for (size_t i = 0; i < loads->count; i++) {
        append(&cases, case_of(m, &loads->cases[i]));
    }
    set(&o, "load_cases", object_done(cases));
    set(&o, "restraint", words(kent_restraint_word(h->chosen)));
    set(&o, "held", json_boolean(h->held));
    set(&o, "needs_nothing", json_boolean(h->needs_nothing));
    set(&o, "block", block_of(h));
    set(&o, "ports", ports_of(m, f, loads, h));
    set(&o, "restrained_length_m", real(h->restrained_length));
    set(&o, "restrained", legs_of(m, f, h));
    set(&o, "cautions", notes_of(&h->cautions));
    return object_done(o);
}

/* ---- the tail -------------------------------------------------------------------- */

/* One "what\tvalue\twhy" of the model. */
static json_t *assumed_of(const char *note)
{
    static const char *const KEYS[] = {"what", "value", "why"};
    char *copy = kent_copy_text(note);
    if (!copy) return NULL;
    kent_object o = object_new();
    char *rest = copy;
    for (size_t k = 0; k < 3; k++) {
        char *part = rest ? strsep(&rest, "\t") : NULL;
        set(&o, KEYS[k], part ? words(part) : json_null());
    }
    free(copy);
    return object_done(o);
}

kent_status kent_report_json(const kent_results *r, kent_sink sink)
{
    kent_writer w = {.results = r, .model = r->model, .sink = sink};
    put_head(&w);
    put_steady(&w);
    put_scenarios(&w);
    open_list(&w, ",\n\"fittings\": [");
    for (size_t i = 0; i < r->model->fitting_count; i++) {
        put_element(&w, fitting_of(r, i));
    }
    open_list(&w, "],\n\"assumed\": [");
    for (size_t i = 0; i < r->model->assumed.count; i++) {
        put_element(&w, assumed_of(r->model->assumed.text[i]));
    }
    put_text(&w, "],\n\"test\": ");
    put_value(&w, test_of(r));
    put_text(&w, ",\n\"concrete_m3\": ");
    put_value(&w, real(r->restraints->concrete));
    put_text(&w, ",\n\"not_held\": ");
    put_value(&w, count_of(r->restraints->not_held));
    put_text(&w, ",\n\"limit_exceeded\": ");
    put_value(&w, json_boolean(r->limit_exceeded));
    put_text(&w, ",\n\"cautions\": ");
    put_value(&w, notes_of(&r->cautions));
    put_text(&w, "}\n");
    return w.status;
}
