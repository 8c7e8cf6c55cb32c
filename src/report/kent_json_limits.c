/* What was reached and what is asked, in results.json. */
#include "kent_json.h"
#include "kent_limit_table.h"

static const char *rating_word(kent_rating rating)
{
    static const char *const WORDS[KENT_RATINGS] = {
        [KENT_RATING_SERVICE] = "service",
        [KENT_RATING_SURGE] = "surge",
        [KENT_RATING_RECURRING] = "recurring",
        [KENT_RATING_TEST] = "test",
    };
    return WORDS[rating];
}

static json_t *or_null(const char *text)
{
    return text && text[0] != '\0' ? kent_json_words(text) : json_null();
}

static json_t *limit_of(const kent_results *r, const kent_limit *l)
{
    const kent_model *m = r->model;
    const kent_scenario_result *run = l->march >= 0 ? &r->scenarios[l->march] : NULL;
    const int state = run ? run->state : l->state;
    const bool rated = l->kind <= KENT_LIMIT_FITTING;
    const char *standard = l->note >= 0                 ? m->notes[l->note].standard
                           : l->kind == KENT_LIMIT_PIPE ? m->pipes[l->pipe].standard
                                                        : NULL;
    kent_object o = kent_object_new();
    kent_object_set(&o, "limit", kent_json_words(kent_limit_word(l->kind)));
    kent_object_set(&o, "case", kent_json_words(l->when.s));
    kent_object_set(&o, "scenario",
                    run ? kent_json_words(m->scenarios[run->scenario].id)
                        : json_null());
    kent_object_set(&o, "state",
                    state >= 0 ? kent_json_words(m->states[state].id) : json_null());
    kent_object_set(&o, "for_comparison", json_boolean(l->for_comparison));
    kent_object_set(&o, "pipe", or_null(l->pipe >= 0 ? m->pipes[l->pipe].id : NULL));
    kent_object_set(&o, "fitting", or_null(l->note >= 0 ? m->notes[l->note].id : NULL));
    kent_object_set(&o, "at", or_null(l->point >= 0 ? m->points[l->point].id : NULL));
    kent_object_set(&o, "chainage_m", kent_json_real(l->chainage));
    kent_object_set(&o, "time_s", kent_json_real(l->time));
    kent_object_set(&o, "reached_Pa", kent_json_real(l->reached));
    kent_object_set(&o, "asked_Pa", kent_json_real(l->asked));
    kent_object_set(&o, "rating",
                    rated ? kent_json_words(rating_word(l->rating)) : json_null());
    kent_object_set(&o, "standard", or_null(standard));
    kent_object_set(&o, "exceeded", json_boolean(l->exceeded));
    return kent_object_done(o);
}

void kent_json_put_limits(kent_writer *w)
{
    kent_json_open_list(w, ",\n\"limits\": [");
    for (size_t i = 0; i < w->results->limit_count; i++) {
        kent_json_put_element(w, limit_of(w->results, &w->results->limits[i]));
    }
    kent_json_put_text(w, "]");
}
