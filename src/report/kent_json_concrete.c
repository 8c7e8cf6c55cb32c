/* The concrete of a fitting's block, and what it takes to build, in results.json. */
#include "kent_json.h"

static const double DAY = 86400.0; /* s */

static json_t *contact_of(const kent_concrete_check *c)
{
    kent_object o = kent_object_new();
    kent_object_set(&o, "along_m", kent_json_real(c->contact.width));
    kent_object_set(&o, "across_m", kent_json_real(c->contact.height));
    kent_object_set(&o, "assumed", json_boolean(c->contact_assumed));
    kent_object_set(&o, "needed_m2", kent_json_real(c->contact_needed));
    kent_object_set(&o, "design_load_N", kent_json_real(c->load));
    kent_object_set(&o, "stress_Pa", kent_json_real(c->pressure));
    kent_object_set(&o, "allowed_Pa", kent_json_real(c->allowed));
    kent_object_set(&o, "utilisation", kent_json_real(c->use));
    kent_object_set(&o, "splitting", json_boolean(c->splits));
    return kent_object_done(o);
}

static json_t *beyond_of(const kent_concrete_check *c)
{
    if (!c->beyond_45) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "thickness_m", kent_json_real(c->thick));
    kent_object_set(&o, "bending", kent_json_real(c->wide.bending));
    kent_object_set(&o, "shear", kent_json_real(c->wide.shear));
    kent_object_set(&o, "punching", kent_json_real(c->wide.punching));
    return kent_object_done(o);
}

json_t *kent_json_concrete(const kent_concrete_check *c)
{
    if (!c->made) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "code",
                    kent_json_words(c->code == KENT_EN_1992 ? "EN1992" : "ACI318"));
    kent_object_set(&o, "strength_Pa", kent_json_real(c->strength));
    kent_object_set(&o, "strength_assumed", json_boolean(c->strength_assumed));
    kent_object_set(&o, "contact", contact_of(c));
    kent_object_set(&o, "beyond_45_degrees", beyond_of(c));
    kent_object_set(&o, "strength_before_test_Pa", kent_json_real(c->strength_needed));
    kent_object_set(&o, "days_before_test", kent_json_real(c->age / DAY));
    return kent_object_done(o);
}

json_t *kent_json_quantities(const kent_quantities *q)
{
    if (!(q->concrete > 0.0)) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "concrete_m3", kent_json_real(q->concrete));
    kent_object_set(&o, "excavation_m3", kent_json_real(q->excavation));
    kent_object_set(&o, "formed_m2", kent_json_real(q->formed));
    return kent_object_done(o);
}

static json_t *sides_of(const kent_block *b)
{
    if (b->type == KENT_BLOCK_NONE) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "type", kent_json_words(kent_block_word(b->type)));
    kent_object_set(&o, "width_m", kent_json_real(b->width));
    kent_object_set(&o, "height_m", kent_json_real(b->height));
    kent_object_set(&o, "thickness_m", kent_json_real(b->thickness));
    kent_object_set(&o, "volume_m3", kent_json_real(b->volume));
    kent_object_set(&o, "face_volume_m3", kent_json_real(b->face_volume));
    return kent_object_done(o);
}

json_t *kent_json_either(const kent_either *e)
{
    if (!e->looked_at) return json_null();
    kent_object o = kent_object_new();
    kent_object_set(&o, "block", sides_of(&e->block));
    kent_object_set(&o, "quantities", kent_json_quantities(&e->quantities));
    kent_object_set(&o, "no_block",
                    e->no_block ? kent_json_words(e->no_block) : json_null());
    kent_object_set(&o, "joints_hold", json_boolean(e->joints));
    kent_object_set(&o, "no_length",
                    e->no_length ? kent_json_words(e->no_length) : json_null());
    return kent_object_done(o);
}
