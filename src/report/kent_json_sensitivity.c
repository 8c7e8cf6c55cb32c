#include "kent_json.h"

#include <math.h>

static json_t *text_of(const char *text)
{
    return text[0] != '\0' ? kent_json_words(text) : json_null();
}

/* g NULL: that march stopped. */
static json_t *row_of(const kent_results *r, size_t i, const char *what, double factor,
                      const kent_gauge *g)
{
    kent_object o = kent_object_new();
    kent_object_set(&o, "fitting", kent_json_words(r->model->fittings[i].id));
    kent_object_set(&o, "moved", kent_json_words(what));
    kent_object_set(&o, "factor", kent_json_real(factor));
    kent_object_set(&o, "stopped", json_boolean(!g));
    kent_object_set(&o, "highest_Pa", kent_json_real(g ? g->highest : NAN));
    kent_object_set(&o, "lowest_Pa", kent_json_real(g ? g->lowest : NAN));
    kent_object_set(&o, "held", g ? json_boolean(g->held) : json_null());
    kent_object_set(&o, "block",
                    g ? kent_json_words(kent_block_word(g->type)) : json_null());
    kent_object_set(&o, "bearing_area_m2", kent_json_real(g ? g->area : NAN));
    kent_object_set(&o, "volume_m3", kent_json_real(g ? g->volume : NAN));
    kent_object_set(&o, "restrained_length_m", kent_json_real(g ? g->length : NAN));
    kent_object_set(&o, "load_case", g ? text_of(g->governing.s) : json_null());
    return kent_object_done(o);
}

void kent_json_put_sensitivity(kent_writer *w)
{
    const kent_results *r = w->results;
    const kent_sensitivity *s = r->sensitivity;
    kent_json_open_list(w, ",\n\"sensitivity\": [");
    for (size_t i = 0; i < s->fitting_count; i++) {
        kent_json_put_element(w, row_of(r, i, "nothing", 1.0, &s->base[i]));
        for (int k = 0; k < KENT_VARIES * KENT_WAYS; k++) {
            const int what = k / KENT_WAYS, way = k % KENT_WAYS;
            const kent_gauge *g = s->varied[what][way];
            if (!g && !s->stopped[what][way].status) continue;
            const kent_variation v =
                kent_variation_of((kent_vary)what, way == KENT_MORE);
            kent_json_put_element(
                w, row_of(r, i, kent_vary_word(v.what), v.factor, g ? g + i : NULL));
        }
    }
    kent_json_put_text(w, "]");
}
