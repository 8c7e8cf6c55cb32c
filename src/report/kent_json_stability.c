/* Straps and stability of a fitting's block, in results.json. */
#include "kent_json.h"

#include <math.h>

static json_t *straps_of(const kent_holding *h)
{
    const kent_straps *s = &h->straps;
    if (!h->held || !(s->force > 0.0)) return json_null();

    kent_object o = kent_object_new();
    kent_object_set(&o, "force_N", kent_json_real(s->force));
    kent_object_set(&o, "legs",
                    s->legs > 0 ? kent_json_count((size_t)s->legs) : json_null());
    kent_object_set(&o, "diameter_m", kent_json_real(s->diameter));
    kent_object_set(&o, "stress_Pa", kent_json_real(s->stress));
    kent_object_set(&o, "anchorage_m", kent_json_real(s->anchorage));
    kent_object_set(&o, "embedment_m", kent_json_real(s->embedment));
    kent_object_set(&o, "hooked", json_boolean(s->hooked));
    return kent_object_done(o);
}

static json_t *stand_of(const kent_fitting_loads *loads, const kent_stand *s)
{
    if (isnan(s->reached)) return json_null();

    kent_object o = kent_object_new();
    kent_object_set(&o, "reached", kent_json_real(s->reached));
    kent_object_set(&o, "asked", kent_json_real(s->asked > 0.0 ? s->asked : NAN));
    kent_object_set(&o, "case",
                    s->load_case >= 0
                        ? kent_json_words(loads->cases[s->load_case].title.s)
                        : json_null());
    return kent_object_done(o);
}

static json_t *base_of(const kent_stability *s, kent_hour hour)
{
    if (isnan(s->pressure[hour].reached)) return json_null();

    const kent_base_pressure *p = &s->base[hour];
    kent_object o = kent_object_new();
    kent_object_set(&o, "largest_Pa", kent_json_real(p->largest));
    kent_object_set(&o, "least_Pa", kent_json_real(p->least));
    kent_object_set(&o, "eccentricity_m", kent_json_real(p->eccentricity));
    kent_object_set(&o, "outside_third", json_boolean(p->outside_third));
    return kent_object_done(o);
}

static json_t *hour_of(const kent_fitting_loads *loads, const kent_stability *s,
                       kent_hour hour)
{
    kent_object o = kent_object_new();
    kent_object_set(&o, "sliding", stand_of(loads, &s->sliding[hour]));
    kent_object_set(&o, "overturning", stand_of(loads, &s->overturning[hour]));
    kent_object_set(&o, "bearing_under_base", stand_of(loads, &s->pressure[hour]));
    kent_object_set(&o, "base", base_of(s, hour));
    return kent_object_done(o);
}

json_t *kent_json_stability(const kent_fitting_loads *loads, const kent_holding *h)
{
    const kent_stability *s = &h->stability;
    if (!h->held || !s->judged) return json_null();

    kent_object o = kent_object_new();
    kent_object_set(&o, "weight_N", kent_json_real(s->weight));
    kent_object_set(&o, "soil_above_N", kent_json_real(s->soil_above));
    kent_object_set(&o, "eccentricity_m", kent_json_real(s->eccentricity));
    kent_object_set(&o, "moment_Nm", kent_json_real(s->moment));
    kent_object_set(&o, "working", hour_of(loads, s, KENT_AT_WORK));
    kent_object_set(&o, "test", hour_of(loads, s, KENT_AT_TEST));
    kent_object_set(&o, "flotation_empty", kent_json_real(s->flotation[0]));
    kent_object_set(&o, "flotation_full", kent_json_real(s->flotation[1]));
    kent_object_set(
        &o, "flotation_asked",
        kent_json_real(s->flotation_asked > 0.0 ? s->flotation_asked : NAN));
    kent_object_set(&o, "widened_steps", kent_json_count((size_t)h->block.widened));
    kent_object_set(&o, "straps", straps_of(h));
    return kent_object_done(o);
}
