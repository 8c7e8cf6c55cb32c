/* results.json: which load cases were asked for, the next to what governs, and what
 * pushes other ways. */
#include "kent_json.h"

json_t *kent_json_completeness(const kent_results *r)
{
    kent_object list = kent_list_new();

    for (size_t i = 0; i < KENT_NEEDED_CASES; i++) {
        const kent_needed *n = &r->completeness[i];
        if (!n->asked) continue;
        kent_object o = kent_object_new();
        kent_object_set(&o, "load_case", kent_json_words(n->what));
        kent_object_set(&o, "present", json_boolean(n->present));
        kent_object_set(&o, "waived",
                        n->waived ? kent_json_words(n->waived) : json_null());
        kent_list_append(&list, kent_object_done(o));
    }
    return kent_object_done(list);
}

json_t *kent_json_runner_up(const kent_fitting_loads *loads, const kent_holding *h)
{
    if (h->governing < 0 || h->runner_up < 0) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "load_case", kent_json_words(loads->cases[h->runner_up].name));
    kent_object_set(&o, "design_thrust_N", kent_json_real(h->runner_up_load));
    kent_object_set(&o, "margin_percent", kent_json_real(100.0 * h->runner_up_margin));
    return kent_object_done(o);
}

static const char *taken_word(kent_taken taken)
{
    switch (taken) {
    case KENT_TAKEN_BY_NOTHING:
        break;
    case KENT_TAKEN_BY_FACE:
        return "face";
    case KENT_TAKEN_BY_FRICTION:
        return "friction";
    case KENT_TAKEN_BY_JOINTS:
        return "joints";
    }
    return "nothing";
}

json_t *kent_json_other_ways(const kent_fitting_loads *loads, const kent_holding *h)
{
    static const double DEGREES = 57.29577951308232; /* per radian */
    kent_object list = kent_list_new();

    for (size_t i = 0; i < h->other_way_count; i++) {
        const kent_other_way *way = &h->other_ways[i];
        kent_object o = kent_object_new();
        kent_object_set(&o, "load_case",
                        kent_json_words(loads->cases[way->load_case].name));
        kent_object_set(&o, "time_s", kent_json_real(way->time));
        kent_object_set(&o, "thrust_N", kent_json_vector(way->thrust));
        kent_object_set(&o, "horizontal_N", kent_json_real(way->sideways));
        kent_object_set(&o, "design_thrust_N", kent_json_real(way->load));
        kent_object_set(&o, "turned_deg", kent_json_real(DEGREES * way->turned));
        kent_object_set(&o, "taken_by", kent_json_words(taken_word(way->taken)));
        kent_list_append(&list, kent_object_done(o));
    }
    return kent_object_done(list);
}
