/* results.json: what the ground gives a fitting's face by every way, and who else is
 * there. */
#include "kent_json.h"

static const double DEGREES = 180.0 / 3.14159265358979323846;

static json_t *way_of(const kent_bearing_way *way, kent_way which)
{
    kent_object o = kent_object_new();
    kent_object_set(&o, "way", kent_json_words(kent_way_word(which)));
    kent_object_set(&o, "decides", json_boolean(way->decides));
    kent_object_set(&o, "bearing_Pa", kent_json_real(way->bearing));
    kent_object_set(&o, "area_m2", kent_json_real(way->area));
    kent_object_set(&o, "passive_coefficient", kent_json_real(way->passive));
    return kent_object_done(o);
}

static json_t *bearing_of(const kent_bearing_view *view)
{
    if (!view->seen) return json_null();
    kent_object ways = kent_list_new();
    kent_object o = kent_object_new();
    for (kent_way k = KENT_WAY_CONSTANT; k < KENT_BEARING_WAYS; k++) {
        if (!view->ways[k].stated) continue;
        kent_list_append(&ways, way_of(&view->ways[k], k));
    }
    kent_object_set(&o, "on_fill", json_boolean(view->on_fill));
    kent_object_set(&o, "depth_m", kent_json_real(view->depth));
    kent_object_set(&o, "water_table_m", kent_json_real(view->water_table));
    kent_object_set(&o, "effective_stress_Pa", kent_json_real(view->stress));
    kent_object_set(&o, "cohesion_Pa", kent_json_real(view->cohesion));
    kent_object_set(&o, "factor_inside", kent_json_real(view->factor_inside));
    kent_object_set(&o, "falls_deg", kent_json_real(view->falls * DEGREES));
    kent_object_set(&o, "passive_force_N", kent_json_real(view->passive));
    kent_object_set(&o, "active_force_N", kent_json_real(view->active));
    kent_object_set(&o, "ways", kent_object_done(ways));
    return kent_object_done(o);
}

static const char *meeting_word(kent_meeting how)
{
    switch (how) {
    case KENT_MEETS_BODY:
        return "same place";
    case KENT_MEETS_OPENED:
        return "its block in this ground";
    case KENT_MEETS_SHARED:
        return "same ground";
    case KENT_MEETS_MAIN:
        return "main in this ground";
    }
    return "";
}

static json_t *neighbours_of(const kent_results *r, size_t index)
{
    const kent_model *m = r->model;
    size_t count = 0;
    const kent_neighbour *met = kent_space_of(&r->restraints->space, index, &count);
    kent_object list = kent_list_new();
    for (size_t i = 0; i < count; i++) {
        const kent_neighbour *n = &met[i];
        kent_object o = kent_object_new();
        kent_object_set(&o, "fitting",
                        n->other >= 0 ? kent_json_words(m->fittings[n->other].id)
                                      : json_null());
        kent_object_set(&o, "pipe",
                        n->pipe >= 0 ? kent_json_words(m->pipes[n->pipe].id)
                                     : json_null());
        kent_object_set(&o, "how", kent_json_words(meeting_word(n->how)));
        kent_object_set(&o, "clear_m", kent_json_real(n->clear));
        kent_object_set(&o, "share", kent_json_real(n->share));
        kent_list_append(&list, kent_object_done(o));
    }
    return kent_object_done(list);
}

json_t *kent_json_ground(const kent_results *r, size_t fitting)
{
    const kent_holding *h = &r->restraints->fittings[fitting];
    kent_object o = kent_object_new();
    kent_object_set(&o, "bearing", bearing_of(&h->bearing));
    kent_object_set(&o, "block_share", kent_json_real(h->block_share));
    kent_object_set(&o, "joints_share", kent_json_real(h->joints_share));
    kent_object_set(&o, "neighbours", neighbours_of(r, fitting));
    return kent_object_done(o);
}
