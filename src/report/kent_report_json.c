/* results.json: SI, full precision, written element by element so that a large main
 * needs no tree of its own in memory. A value that is not there is null. */
#include "kent_json.h"
#include "kent_pressures.h"
#include "kent_shown.h"
#include "kent_sink.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* Of one march; the rest is counted. */
enum { CAVITIES_LISTED = 100 };

static const double DEGREES = 57.29577951308232; /* per radian */

/* ---- the head -------------------------------------------------------------------- */

static json_t *water_of(const kent_water *water)
{
    kent_object o = kent_object_new();
    kent_object_set(&o, "density_kgm3", kent_json_real(water->density));
    kent_object_set(&o, "bulk_modulus_Pa", kent_json_real(water->bulk_modulus));
    kent_object_set(&o, "viscosity_Pas", kent_json_real(water->viscosity));
    kent_object_set(&o, "vapour_pressure_Pa", kent_json_real(water->vapour_pressure));
    kent_object_set(&o, "sound_speed_ms", kent_json_real(water->sound_speed));
    return kent_object_done(o);
}

static json_t *project_of(const kent_project *p)
{
    const struct {
        const char *key, *value;
    } rows[] = {{"number", p->number},     {"drawing", p->drawing},
                {"revision", p->revision}, {"designer", p->designer},
                {"checker", p->checker},   {"utility", p->utility},
                {"date", p->date},         {"codes", p->codes}};
    kent_object o = kent_object_new();
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        const char *value = rows[i].value;
        kent_object_set(&o, rows[i].key,
                        value[0] != '\0' ? kent_json_words(value) : json_null());
    }
    return kent_object_done(o);
}

static void put_head(kent_writer *w)
{
    char checksum[20];
    (void)snprintf(checksum, sizeof checksum, "%016llx", w->model->checksum);
    kent_json_put_text(w,
                       "{\"format\": 1,\n\"program\": \"kentledge\",\n\"version\": ");
    kent_json_put(w, kent_json_words(KENT_VERSION));
    kent_json_put_text(w, ",\n\"title\": ");
    kent_json_put(w, kent_json_words(w->model->title));
    kent_json_put_text(w, ",\n\"project\": ");
    kent_json_put(w, project_of(&w->model->project));
    kent_json_put_text(w, ",\n\"case_checksum\": ");
    kent_json_put(w, kent_json_words(checksum));
    kent_json_put_text(w, ",\n\"water\": ");
    kent_json_put(w, water_of(&w->model->water));
}

/* ---- steady ---------------------------------------------------------------------- */

static json_t *steady_point(const kent_model *m, size_t point, double head)
{
    const kent_point *p = &m->points[point];
    kent_object o = kent_object_new();
    kent_object_set(&o, "id", kent_json_words(p->id));
    kent_object_set(&o, "head_m", kent_json_real(head));
    kent_object_set(&o, "pressure_Pa",
                    kent_json_real(kent_model_pressure(m, head, p->at.z)));
    return kent_object_done(o);
}

static json_t *steady_pipe(const kent_results *r, const kent_steady *s, size_t index)
{
    const kent_span *span = &r->model->spans[index];
    const double flow = s->span_flow[index];
    const kent_grid *grid = r->scenario_count > 0 ? r->scenarios[0].grid : NULL;
    kent_object o = kent_object_new();
    kent_object_set(&o, "id", kent_json_words(span->id));
    kent_object_set(&o, "flow_m3s", kent_json_real(flow));
    kent_object_set(&o, "velocity_ms", kent_json_real(flow / span->area));
    kent_object_set(&o, "wave_speed_ms", kent_json_real(span->wave_speed));
    kent_object_set(&o, "wave_speed_used_ms",
                    kent_json_real(grid ? grid->wave_speed_used[index] : NAN));
    kent_object_set(&o, "reaches",
                    grid ? json_integer(grid->reaches[index]) : json_null());
    return kent_object_done(o);
}

/* A pump's row holds its duty too. */
static json_t *steady_device(const kent_model *m, const kent_steady *s, size_t index)
{
    const kent_device *d = &m->devices[index];
    kent_object o = kent_object_new();
    kent_object_set(&o, "id", kent_json_words(d->id));
    kent_object_set(&o, "kind", kent_json_words(kent_device_word(d->kind)));
    kent_object_set(&o, "flow_m3s", kent_json_real(s->device_flow[index]));
    if (d->kind == KENT_DEVICE_PUMP) {
        const kent_pump_duty duty = kent_steady_pump(s, index);
        kent_object_set(&o, "running", json_integer(duty.running));
        kent_object_set(&o, "lift_m", kent_json_real(duty.lift));
        kent_object_set(&o, "power_W", kent_json_real(duty.power));
    }
    return kent_object_done(o);
}

/* head: room for the points' heads. */
static void put_state(kent_writer *w, size_t state, double *head)
{
    const kent_model *m = w->model;
    const kent_steady *s = w->results->steadies[state];
    kent_point_steady_heads(m, s, head);
    kent_json_put_text(w, state > 0 ? ",\n{\"state\": " : "\n{\"state\": ");
    kent_json_put(w, kent_json_words(m->states[state].id));
    kent_json_open_list(w, ", \"points\": [");
    for (size_t i = 0; i < m->point_count; i++) {
        kent_json_put_element(w, steady_point(m, i, head[i]));
    }
    kent_json_open_list(w, "],\n\"pipes\": [");
    for (size_t i = 0; i < m->span_count; i++) {
        kent_json_put_element(w, steady_pipe(w->results, s, i));
    }
    kent_json_open_list(w, "],\n\"devices\": [");
    for (size_t i = 0; i < m->device_count; i++) {
        kent_json_put_element(w, steady_device(m, s, i));
    }
    kent_json_put_text(w, "]}");
}

static void put_steady(kent_writer *w)
{
    const kent_model *m = w->model;
    double *head = kent_alloc(m->point_count, sizeof *head);
    if (!head) {
        w->status = KENT_E_NOMEM;
        return;
    }
    kent_json_put_text(w, ",\n\"steady\": [");
    for (size_t i = 0; m->span_count > 0 && i < w->results->steady_count; i++) {
        put_state(w, i, head);
    }
    kent_json_put_text(w, "]");
    free(head);
}

/* ---- scenarios ------------------------------------------------------------------- */

static json_t *scenario_point(const kent_model *m, size_t point,
                              const kent_scenario_result *s)
{
    const kent_point *p = &m->points[point];
    const kent_peak *peak = &s->points[point];
    const double z = p->at.z;
    kent_object o = kent_object_new();
    kent_object_set(&o, "id", kent_json_words(p->id));
    kent_object_set(&o, "highest_head_m", kent_json_real(peak->highest_head));
    kent_object_set(&o, "highest_at_s", kent_json_real(peak->highest_at));
    kent_object_set(&o, "lowest_head_m", kent_json_real(peak->lowest_head));
    kent_object_set(&o, "lowest_at_s", kent_json_real(peak->lowest_at));
    kent_object_set(&o, "highest_pressure_Pa",
                    kent_json_real(kent_model_pressure(m, peak->highest_head, z)));
    kent_object_set(&o, "lowest_pressure_Pa",
                    kent_json_real(kent_model_pressure(m, peak->lowest_head, z)));
    kent_object_set(&o, "cavity_m3",
                    s->hollow[point] > 0.0 ? kent_json_real(s->hollow[point])
                                           : json_null());
    kent_object_set(&o, "below_vapour", json_boolean(s->touched[point]));
    return kent_object_done(o);
}

static void set_swing(kent_object *o, const char *name, const kent_swing *e)
{
    kent_object of = kent_object_new();
    kent_object_set(&of, "highest", kent_json_real(e->highest));
    kent_object_set(&of, "highest_at_s", kent_json_real(e->highest_at));
    kent_object_set(&of, "lowest", kent_json_real(e->lowest));
    kent_object_set(&of, "lowest_at_s", kent_json_real(e->lowest_at));
    kent_object_set(o, name, kent_object_done(of));
}

/* SI, the unit in each quantity's name. */
static json_t *scenario_device(const kent_model *m, size_t device,
                               const kent_scenario_result *s)
{
    const kent_device *d = &m->devices[device];
    const kent_device_extreme *of = &s->devices[device];
    const kent_device_quantity *q = kent_device_quantities(d->kind);
    kent_object o = kent_object_new();
    kent_object_set(&o, "id", kent_json_words(kent_device_name(m, device).s));
    kent_object_set(&o, "at", kent_json_words(m->points[d->point].id));
    kent_object_set(&o, "kind", kent_json_words(kent_device_word(d->kind)));
    kent_object_set(&o, "left_out",
                    json_boolean(kent_device_is_left_out(m, device, s->scenario)));
    set_swing(&o, "flow_m3s", &of->flow);
    for (int j = 0; j < KENT_TOLD && q[j].name; j++) {
        set_swing(&o, q[j].name, &of->told[j]);
    }
    kent_object_set(&o, "caution",
                    of->caution ? kent_json_words(of->caution) : json_null());
    return kent_object_done(o);
}

/* Called after its point, or "A@12.5": the pipe and metres from its start. */
static json_t *scenario_cavity(const kent_model *m, const kent_cavity *c)
{
    kent_object o = kent_object_new();
    char id[2 * KENT_ID];
    if (c->node >= 0) {
        (void)snprintf(id, sizeof id, "%s", m->points[m->nodes[c->node].point].id);
    } else {
        (void)snprintf(id, sizeof id, "%s@%.6g", m->spans[c->span].id, c->chainage);
    }
    kent_object_set(&o, "id", kent_json_words(id));
    kent_object_set(&o, "pipe",
                    c->span < 0 ? json_null() : kent_json_words(m->spans[c->span].id));
    kent_object_set(&o, "chainage_m", kent_json_real(c->chainage));
    kent_object_set(&o, "largest_m3", kent_json_real(c->largest));
    kent_object_set(&o, "largest_at_s", kent_json_real(c->largest_at));
    kent_object_set(&o, "opened_s", kent_json_real(c->opened));
    kent_object_set(&o, "first_closed_s", kent_json_real(c->closed));
    kent_object_set(&o, "last_closed_s", kent_json_real(c->collapsed));
    kent_object_set(&o, "times", kent_json_count((size_t)c->count));
    kent_object_set(&o, "pulse_m", kent_json_real(c->pulse));
    return kent_object_done(o);
}

/* How the pressure of the site test was found, and where it is read. */
static json_t *test_of(const kent_results *r)
{
    const kent_site_test *t = &r->loads->test;
    const bool none = t->rule == KENT_TEST_FIXED && isnan(t->pressure);
    if (none) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "rule", kent_json_words(kent_site_test_rule_word(t->rule)));
    kent_object_set(&o, "gauge",
                    t->gauge >= 0 ? kent_json_words(r->model->points[t->gauge].id)
                                  : json_null());
    kent_object_set(&o, "pressure_Pa", kent_json_real(t->pressure));
    return kent_object_done(o);
}

static void put_scenario(kent_writer *w, size_t march)
{
    const kent_scenario_result *s = &w->results->scenarios[march];
    const kent_model *m = w->model;
    kent_json_put_text(w, "\n{\"id\": ");
    kent_json_put(w, kent_json_words(m->scenarios[s->scenario].id));
    kent_json_put_text(w, ", \"state\": ");
    kent_json_put(w, kent_json_words(m->states[s->state].id));
    kent_json_put_text(w, ", \"time_step_s\": ");
    kent_json_put(w, kent_json_real(s->step));
    kent_json_put_text(w, ", \"time_steps\": ");
    kent_json_put(w, kent_json_count(s->steps));
    kent_json_put_text(w, ", \"numerical_uncertainty_m\": ");
    kent_json_put(w, kent_json_real(s->uncertainty));
    kent_json_put_text(w, ", \"grid_points_below_vapour\": ");
    kent_json_put(w, kent_json_count(s->below_vapour));
    kent_json_open_list(w, ",\n\"points\": [");
    for (size_t i = 0; i < m->point_count; i++) {
        kent_json_put_element(w, scenario_point(m, i, s));
    }
    kent_json_put_text(w, "]");
    kent_json_open_list(w, ",\n\"devices\": [");
    for (size_t i = 0; i < m->device_count; i++) {
        kent_json_put_element(w, scenario_device(m, i, s));
    }
    kent_json_put_text(w, "],\n\"cavity_places\": ");
    kent_json_put(w, kent_json_count(s->cavity_count));
    kent_json_open_list(w, ",\n\"cavities\": [");
    for (size_t i = 0; i < s->cavity_count && i < CAVITIES_LISTED; i++) {
        kent_json_put_element(w, scenario_cavity(m, &s->cavities[i]));
    }
    kent_json_put_text(w, "]");
    kent_json_put_screening(w, march);
    kent_json_put_swings(w, march);
    kent_json_put_text(w, "}");
}

static void put_scenarios(kent_writer *w)
{
    kent_json_put_text(w, ",\n\"scenarios\": [");
    for (size_t i = 0; i < w->results->scenario_count; i++) {
        if (i > 0) kent_json_put_text(w, ",");
        put_scenario(w, i);
    }
    kent_json_put_text(w, "]");
}

/* ---- fittings -------------------------------------------------------------------- */

/* null: of no state in particular. */
static json_t *state_of(const kent_model *m, const kent_load_case *c)
{
    return c && c->state >= 0 ? kent_json_words(m->states[c->state].id) : json_null();
}

static json_t *case_of(const kent_model *m, const kent_load_case *c)
{
    const kent_instant *at = &c->worst[KENT_RESULTANT];
    const kent_vec3 thrust = at->set ? at->balance.thrust : (kent_vec3){NAN, NAN, NAN};
    kent_object o = kent_object_new();
    kent_object_set(&o, "name", kent_json_words(c->name));
    kent_object_set(&o, "state", state_of(m, c));
    kent_object_set(&o, "time_s", kent_json_real(at->set ? at->time : NAN));
    kent_object_set(&o, "pressure_Pa", kent_json_real(at->set ? at->pressure : NAN));
    kent_object_set(&o, "thrust_N", kent_json_vector(thrust));
    kent_object_set(&o, "safety_factor", kent_json_real(c->safety_factor));
    kent_object_set(&o, "design_thrust_N",
                    kent_json_real(c->safety_factor * kent_vec3_length(thrust)));
    return kent_object_done(o);
}

static json_t *face_of(const kent_block *b)
{
    if (!b->has_face) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "width_m", kent_json_real(b->face.width));
    kent_object_set(&o, "height_m", kent_json_real(b->face.height));
    kent_object_set(&o, "thickness_m", kent_json_real(b->face_thickness));
    kent_object_set(&o, "volume_m3", kent_json_real(b->face_volume));
    kent_object_set(&o, "own_side", b->own_side ? json_true() : json_false());
    kent_object_set(&o, "utilisation", kent_json_real(b->face_utilisation));
    return kent_object_done(o);
}

static json_t *block_of(const kent_holding *h)
{
    const kent_block *b = &h->block;
    const bool none = !h->held || b->type == KENT_BLOCK_NONE;
    kent_object o = kent_object_new();
    kent_object_set(&o, "type",
                    kent_json_words(kent_block_word(none ? KENT_BLOCK_NONE : b->type)));
    /* asked for, and told even where no block could be made of it */
    kent_object_set(&o, "bearing_area_m2",
                    kent_json_real(b->bearing_area > 0.0 ? b->bearing_area : NAN));
    kent_object_set(&o, "width_m", kent_json_real(none ? NAN : b->width));
    kent_object_set(&o, "height_m", kent_json_real(none ? NAN : b->height));
    kent_object_set(&o, "thickness_m", kent_json_real(none ? NAN : b->thickness));
    kent_object_set(&o, "volume_m3", kent_json_real(none ? NAN : b->volume));
    kent_object_set(&o, "allowable_bearing_Pa", kent_json_real(h->allowable_bearing));
    kent_object_set(&o, "bearing_pressure_Pa",
                    kent_json_real(none ? NAN : b->bearing_pressure));
    kent_object_set(&o, "utilisation", kent_json_real(none ? NAN : b->utilisation));
    kent_object_set(&o, "face", none ? json_null() : face_of(b));
    return kent_object_done(o);
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
    kent_object list = kent_list_new();
    for (size_t i = 0; i < count; i++) {
        const kent_port *port = &ports[i];
        const bool known = at && i < at->balance.port_count;
        const kent_port_state *state = known ? &at->balance.port[i] : NULL;
        kent_object o = kent_object_new();
        kent_object_set(&o, "direction", kent_json_vector(port->direction));
        kent_object_set(&o, "pressure_Pa",
                        kent_json_real(state ? state->pressure : NAN));
        kent_object_set(&o, "flow_m3s", kent_json_real(state ? state->flow : NAN));
        kent_object_set(&o, "push_N", kent_json_real(state ? state->push : NAN));
        kent_object_set(&o, "seal_diameter_m", kent_json_real(port->seal_diameter));
        kent_list_append(&list, kent_object_done(o));
    }
    return kent_object_done(list);
}

/* Of the governing case; of a case of no state in particular the only one there is. */
static json_t *state_governing(const kent_results *r, size_t index,
                               const kent_load_case *c)
{
    const kent_model *m = r->model;
    const bool network = m->fittings[index].point >= 0 && m->span_count > 0;
    if (network && m->state_count == 1) return kent_json_words(m->states[0].id);
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
    kent_object_set(o, "load_case", c ? kent_json_words(c->name) : json_null());
    kent_object_set(o, "sense",
                    c ? kent_json_words(kent_shown_sense(h->sense)) : json_null());
    kent_object_set(o, "state", state_governing(r, index, c));
    kent_object_set(o, "scenario",
                    c && c->scenario >= 0
                        ? kent_json_words(m->scenarios[c->scenario].id)
                        : json_null());
    kent_object_set(o, "time_s", kent_json_real(at ? at->time : NAN));
    kent_object_set(o, "pressure_Pa", kent_json_real(at ? at->pressure : NAN));
    kent_object_set(o, "thrust_N", kent_json_vector(thrust));
    kent_object_set(o, "resultant_thrust_N", kent_json_real(kent_vec3_length(thrust)));
    kent_object_set(o, "horizontal_N",
                    kent_json_real(at ? kent_thrust_horizontal(thrust) : NAN));
    kent_object_set(o, "vertical_N", kent_json_real(thrust.z));
    kent_object_set(o, "safety_factor", kent_json_real(h->factor_asked));
    kent_object_set(o, "design_thrust_N", kent_json_real(at ? h->design_thrust : NAN));
    kent_object_set(o, "factor_reached", kent_json_real(h->factor_reached));
}

/* The pipe that a fitting's station counts along, by its id in the case. */
static json_t *pipe_of(const kent_model *m, const kent_fitting *f)
{
    const int span = f->port_count > 0 ? m->ports[f->port_first].span : -1;
    return span >= 0 ? kent_json_words(m->pipes[m->spans[span].pipe].id) : json_null();
}

/* null: none, or a pipe leaves there. */
static json_t *branch_of(const kent_branch *b)
{
    if (b->end == KENT_BRANCH_NONE) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "direction", kent_json_vector(b->direction));
    kent_object_set(&o, "outside_diameter_m", kent_json_real(b->outside_diameter));
    kent_object_set(&o, "inside_diameter_m", kent_json_real(b->inside_diameter));
    kent_object_set(&o, "joint", kent_json_words(kent_joint_word(b->joint)));
    kent_object_set(&o, "end", kent_json_words(kent_branch_end_word(b->end)));
    return kent_object_done(o);
}

static json_t *curve_of(const kent_fitting *f)
{
    if (f->type != KENT_CURVE) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "radius_m", kent_json_real(f->curve_radius));
    kent_object_set(&o, "length_m", kent_json_real(f->curve_length));
    return kent_object_done(o);
}

/* Points whose fittings are told as one. */
static json_t *members_of(const kent_model *m, const kent_fitting *f)
{
    kent_object list = kent_list_new();
    for (size_t i = 0; i < f->member_count; i++) {
        kent_list_append(
            &list, kent_json_words(m->points[m->members[f->member_first + i]].id));
    }
    return kent_object_done(list);
}

static json_t *fitting_of(const kent_results *r, size_t index)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[index];
    const kent_fitting_loads *loads = &r->loads->fittings[index];
    const kent_holding *h = &r->restraints->fittings[index];
    kent_object cases = kent_list_new();
    kent_object o = kent_object_new();
    kent_object_set(&o, "id", kent_json_words(f->id));
    kent_object_set(&o, "at",
                    f->point >= 0 ? kent_json_words(m->points[f->point].id)
                                  : json_null());
    kent_object_set(&o, "pipe", pipe_of(m, f));
    kent_object_set(&o, "type", kent_json_words(kent_fitting_type_word(f->type)));
    kent_object_set(&o, "role",
                    f->role != KENT_ROLE_NONE ? kent_json_words(kent_role_word(f->role))
                                              : json_null());
    kent_object_set(&o, "branch", branch_of(&f->branch));
    kent_object_set(&o, "members", members_of(m, f));
    kent_object_set(&o, "curve", curve_of(f));
    kent_object_set(&o, "angle_deg", kent_json_real(f->angle * DEGREES));
    kent_object_set(&o, "station_m", kent_json_real(f->station));
    set_governing(&o, r, index);
    for (size_t i = 0; i < loads->count; i++) {
        kent_list_append(&cases, case_of(m, &loads->cases[i]));
    }
    kent_object_set(&o, "load_cases", kent_object_done(cases));
    kent_object_set(&o, "runner_up", kent_json_runner_up(loads, h));
    kent_object_set(&o, "other_ways", kent_json_other_ways(loads, h));
    kent_object_set(&o, "restraint", kent_json_words(kent_restraint_word(h->chosen)));
    kent_object_set(&o, "held", json_boolean(h->held));
    kent_object_set(&o, "needs_nothing", json_boolean(h->needs_nothing));
    kent_object_set(&o, "block", block_of(h));
    kent_object_set(&o, "concrete", kent_json_concrete(&h->concrete));
    kent_object_set(&o, "quantities", kent_json_quantities(&h->quantities));
    kent_object_set(&o, "ground", kent_json_ground(r, index));
    kent_object_set(&o, "stability",
                    kent_json_stability(&r->loads->fittings[index], h));
    kent_object_set(&o, "ports", ports_of(m, f, loads, h));
    kent_object_set(&o, "restrained_length_m", kent_json_real(h->restrained_length));
    kent_object_set(&o, "restrained", kent_json_legs(m, f, h));
    kent_object_set(&o, "as_built", kent_json_built(r, index));
    kent_object_set(&o, "block_or_joints", kent_json_either(&h->either));
    kent_object_set(&o, "cautions", kent_json_notes(&h->cautions));
    kent_object_set(&o, "unsafe", kent_json_grave(&h->cautions));
    return kent_object_done(o);
}

/* ---- the tail -------------------------------------------------------------------- */

/* One "what\tvalue\twhy" of the model. */
static json_t *assumed_of(const char *note)
{
    static const char *const KEYS[] = {"what", "value", "why"};
    char *copy = kent_copy_text(note);
    if (!copy) return NULL;
    kent_object o = kent_object_new();
    char *rest = copy;
    for (size_t k = 0; k < 3; k++) {
        char *part = rest ? strsep(&rest, "\t") : NULL;
        kent_object_set(&o, KEYS[k], part ? kent_json_words(part) : json_null());
    }
    free(copy);
    return kent_object_done(o);
}

kent_status kent_report_json(const kent_results *r, kent_sink sink)
{
    kent_writer w = {.results = r, .model = r->model, .sink = sink};
    put_head(&w);
    put_steady(&w);
    put_scenarios(&w);
    kent_json_open_list(&w, ",\n\"fittings\": [");
    for (size_t i = 0; i < r->model->fitting_count; i++) {
        kent_json_put_element(&w, fitting_of(r, i));
    }
    kent_json_open_list(&w, "],\n\"assumed\": [");
    for (size_t i = 0; i < r->model->assumed.count; i++) {
        kent_json_put_element(&w, assumed_of(r->model->assumed.text[i]));
    }
    kent_json_put_text(&w, "],\n\"completeness\": ");
    kent_json_put(&w, kent_json_completeness(r));
    kent_json_put_text(&w, ",\n\"test\": ");
    kent_json_put(&w, test_of(r));
    kent_json_put_text(&w, ",\n\"concrete_m3\": ");
    kent_json_put(&w, kent_json_real(r->restraints->concrete));
    kent_json_put_text(&w, ",\n\"quantities\": ");
    kent_json_put(&w, kent_json_quantities(&r->restraints->quantities));
    kent_json_put_text(&w, ",\n\"not_held\": ");
    kent_json_put(&w, kent_json_count(r->restraints->not_held));
    kent_json_put_systems(&w);
    kent_json_put_pulls(&w);
    kent_json_put_runs(&w);
    kent_json_put_limits(&w);
    kent_json_put_twins(&w);
    kent_json_put_text(&w, ",\n\"limit_exceeded\": ");
    kent_json_put(&w, json_boolean(r->limit_exceeded));
    if (r->sensitivity) kent_json_put_sensitivity(&w);
    kent_json_put_text(&w, ",\n\"cautions\": ");
    kent_json_put(&w, kent_json_notes(&r->cautions));
    kent_json_put_text(&w, ",\n\"unsafe\": ");
    kent_json_put(&w, kent_json_grave(&r->cautions));
    kent_json_put_text(&w, "}\n");
    return w.status;
}
