/* Runs above ground in results.json. */
#include "kent_json.h"

#include <math.h>

static json_t *moment_of(const kent_run_moment *at)
{
    kent_object o = kent_object_new();

    kent_object_set(&o, "force_N", kent_json_real(at->force));
    kent_object_set(&o, "time_s", kent_json_real(at->time));
    return kent_object_done(o);
}

static json_t *march_of(const kent_model *m, size_t index, const kent_run_march *march)
{
    const kent_march it = m->marches[index];
    kent_object times = kent_list_new(), forces = kent_list_new();
    kent_object o = kent_object_new();

    for (size_t i = 0; i < march->history_count; i++) {
        kent_list_append(&times, kent_json_real(march->history[i].time));
        kent_list_append(&forces, kent_json_real(march->history[i].force));
    }
    kent_object_set(&o, "scenario", kent_json_words(m->scenarios[it.scenario].id));
    kent_object_set(&o, "state", kent_json_words(m->states[it.state].id));
    kent_object_set(&o, "for_comparison",
                    json_boolean(m->scenarios[it.scenario].for_comparison));
    kent_object_set(&o, "lowest", moment_of(&march->lowest));
    kent_object_set(&o, "highest", moment_of(&march->highest));
    kent_object_set(&o, "history_time_s", kent_object_done(times));
    kent_object_set(&o, "history_force_N", kent_object_done(forces));
    return kent_object_done(o);
}

static json_t *run_of(const kent_model *m, const kent_run *run)
{
    kent_object marches = kent_list_new();
    kent_object o = kent_object_new();

    for (size_t k = 0; k < run->march_count; k++) {
        if (!run->marches[k].set) continue;
        kent_list_append(&marches, march_of(m, k, &run->marches[k]));
    }
    kent_object_set(&o, "pipe", kent_json_words(m->pipes[m->spans[run->span].pipe].id));
    kent_object_set(&o, "from", kent_json_words(m->points[run->from].id));
    kent_object_set(&o, "to", kent_json_words(m->points[run->to].id));
    kent_object_set(&o, "length_m", kent_json_real(run->length));
    kent_object_set(&o, "direction", kent_json_vector(run->axis));
    kent_object_set(&o, "water_weight_N", kent_json_real(run->water_weight));
    kent_object_set(&o, "pipe_weight_N", kent_json_real(run->pipe_weight));
    kent_object_set(&o, "marches", kent_object_done(marches));
    return kent_object_done(o);
}

void kent_json_put_runs(kent_writer *w)
{
    const kent_loads_result *loads = w->results->loads;

    kent_json_open_list(w, ",\n\"runs\": [");
    for (size_t i = 0; i < loads->run_count; i++) {
        kent_json_put_element(w, run_of(w->model, &loads->runs[i]));
    }
    kent_json_put_text(w, "]");
}
