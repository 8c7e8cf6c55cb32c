/* Figures for a hand check, swings of plastics and scenarios side by side, in
 * results.json. */
#include "kent_json.h"
#include "kent_screen.h"
#include "kent_tiring.h"
#include "kent_twins.h"

#include <stdlib.h>

enum { MOVED = 200 };

/* ---- screening ------------------------------------------------------------------- */

static const char *moved_id(const kent_model *m, const kent_screen *s)
{
    if (s->kind == KENT_EVENT_VALVE) return m->valves[s->target].id;
    if (s->kind == KENT_EVENT_PUMP) return m->pumps[s->target].id;
    return m->points[s->point].id;
}

static json_t *point_id(const kent_model *m, int point)
{
    return point >= 0 ? kent_json_words(m->points[point].id) : json_null();
}

static json_t *screen_of(const kent_model *m, const kent_screen *s)
{
    kent_object o = kent_object_new();
    kent_object_set(&o, "id", kent_json_words(moved_id(m, s)));
    kent_object_set(&o, "at", point_id(m, s->point));
    kent_object_set(&o, "velocity_change_ms", kent_json_real(s->velocity));
    kent_object_set(&o, "wave_speed_ms", kent_json_real(s->wave_speed));
    kent_object_set(&o, "per_velocity_Pa", kent_json_real(s->per_velocity));
    kent_object_set(&o, "sudden_Pa", kent_json_real(s->sudden));
    kent_object_set(&o, "path_ends_at", point_id(m, s->end_point));
    kent_object_set(&o, "path_length_m", kent_json_real(s->length));
    kent_object_set(&o, "return_time_s", kent_json_real(s->return_time));
    kent_object_set(&o, "effective_time_s", kent_json_real(s->time));
    kent_object_set(&o, "michaud_Pa", kent_json_real(s->slow));
    kent_object_set(&o, "linear_Pa", kent_json_real(s->linear));
    kent_object_set(&o, "march_rise_Pa", kent_json_real(s->rise));
    kent_object_set(&o, "march_fall_Pa", kent_json_real(s->fall));
    return kent_object_done(o);
}

void kent_json_put_screening(kent_writer *w, size_t march)
{
    kent_screen *s = kent_alloc(MOVED, sizeof *s);
    bool failed = s == NULL;
    const size_t count = s ? kent_screen_of(w->results, march, s, MOVED, &failed) : 0;
    if (failed && !w->status) w->status = KENT_E_NOMEM;
    kent_json_open_list(w, ",\n\"screening\": [");
    for (size_t i = 0; i < count && i < MOVED; i++) {
        kent_json_put_element(w, screen_of(w->model, &s[i]));
    }
    kent_json_put_text(w, "]");
    free(s);
}

/* ---- swings ---------------------------------------------------------------------- */

static json_t *swing_of(const kent_model *m, size_t pipe, const kent_tiring *s)
{
    kent_object o = kent_object_new();
    kent_object_set(&o, "pipe", kent_json_words(m->pipes[pipe].id));
    kent_object_set(&o, "at", point_id(m, s->point));
    kent_object_set(&o, "chainage_m", kent_json_real(s->chainage));
    kent_object_set(&o, "amplitude_Pa", kent_json_real(s->amplitude));
    kent_object_set(&o, "mean_Pa", kent_json_real(s->mean));
    kent_object_set(&o, "highest_Pa", kent_json_real(s->highest));
    kent_object_set(&o, "lowest_Pa", kent_json_real(s->lowest));
    kent_object_set(&o, "rating_Pa", kent_json_real(s->rating));
    kent_object_set(&o, "cycles", kent_json_real(s->cycles));
    return kent_object_done(o);
}

void kent_json_put_swings(kent_writer *w, size_t march)
{
    kent_json_open_list(w, ",\n\"swings\": [");
    for (size_t i = 0; i < w->model->pipe_count; i++) {
        kent_tiring s;
        if (!kent_tiring_of(w->results, march, i, &s)) continue;
        kent_json_put_element(w, swing_of(w->model, i, &s));
    }
    kent_json_put_text(w, "]");
}

/* ---- side by side ---------------------------------------------------------------- */

static json_t *both(const double value[KENT_TWINS])
{
    kent_object list = kent_list_new();
    kent_list_append(&list, kent_json_real(value[KENT_BESIDE]));
    kent_list_append(&list, kent_json_real(value[KENT_ITSELF]));
    return kent_object_done(list);
}

static json_t *twins_of(const kent_results *r, const kent_twins *t,
                        kent_twin_place *places)
{
    const kent_model *m = r->model;
    const kent_scenario_result *run[KENT_TWINS];
    double cavity[KENT_TWINS];
    for (int k = 0; k < KENT_TWINS; k++) {
        run[k] = &r->scenarios[t->march[k]];
        cavity[k] = kent_twins_cavity(run[k]);
    }
    kent_object o = kent_object_new(), list = kent_list_new(), back = kent_list_new();
    const size_t count = kent_twins_places(r, t, places);
    for (size_t i = 0; i < count; i++) {
        kent_object p = kent_object_new();
        kent_object_set(&p, "at", point_id(m, places[i].point));
        kent_object_set(&p, "highest_Pa", both(places[i].highest));
        kent_object_set(&p, "lowest_Pa", both(places[i].lowest));
        kent_list_append(&list, kent_object_done(p));
    }
    for (size_t i = 0; i < m->device_count; i++) {
        const double lowest[] = {run[0]->devices[i].flow.lowest,
                                 run[1]->devices[i].flow.lowest};
        if (!kent_device_in_line(m->devices[i].kind)) continue;
        kent_object p = kent_object_new();
        kent_object_set(&p, "id", kent_json_words(kent_device_name(m, i).s));
        kent_object_set(&p, "lowest_flow_m3s", both(lowest));
        kent_list_append(&back, kent_object_done(p));
    }
    kent_object_set(&o, "scenario",
                    kent_json_words(m->scenarios[run[KENT_ITSELF]->scenario].id));
    kent_object_set(&o, "beside",
                    kent_json_words(m->scenarios[run[KENT_BESIDE]->scenario].id));
    kent_object_set(&o, "state",
                    kent_json_words(m->states[run[KENT_ITSELF]->state].id));
    kent_object_set(&o, "largest_cavity_m3", both(cavity));
    kent_object_set(&o, "places", kent_object_done(list));
    kent_object_set(&o, "in_line", kent_object_done(back));
    return kent_object_done(o);
}

void kent_json_put_twins(kent_writer *w)
{
    const kent_results *r = w->results;
    kent_twin_place *places = kent_alloc(r->model->point_count, sizeof *places);
    if (!places && !w->status) w->status = KENT_E_NOMEM;
    kent_json_open_list(w, ",\n\"twins\": [");
    for (size_t i = 0; places && i < r->scenario_count; i++) {
        kent_twins t;
        if (!kent_twins_of(r, i, &t)) continue;
        kent_json_put_element(w, twins_of(r, &t, places));
    }
    kent_json_put_text(w, "]");
    free(places);
}
