/* Values that a case and a row of the catalogue share: bearings of a soil, pairs of a
 * list. */
#include "kent_catalogue_internal.h"

#include <math.h>
#include <string.h>

static void replace(const kent_record *record, const char *key, double *value)
{
    if (kent_record_has(record, key)) *value = kent_record_number(record, key);
}

/* ---- pairs of a list ------------------------------------------------------------- */

size_t kent_record_pairs(kent_reader *r, kent_record *record, const char *key,
                         kent_kind first, kent_kind second, size_t most, double *a,
                         double *b)
{
    const kent_twig *list = kent_record_field(record, key)->twig;
    const size_t count = kent_twig_count(list);
    if (count > most) {
        kent_record_complain(r, record, key, "%s has %zu pairs; at most %zu are read",
                             key, count, most);
        return 0;
    }
    for (size_t i = 0; i < count; i++) {
        const kent_twig *pair = kent_twig_child(list, i);
        if (kent_twig_type_of(pair) != KENT_TWIG_LIST || kent_twig_count(pair) != 2) {
            const bool units = first != KENT_RATIO;
            const bool both = second != KENT_RATIO;
            kent_record_complain(
                r, record, key,
                "element %zu of %s must be a pair, as ( %s%s%s, %s%s%s )", i + 1, key,
                units ? "\"" : "", units ? kent_kind_example(first, KENT_SI) : "1.0",
                units ? "\"" : "", both ? "\"" : "",
                both ? kent_kind_example(second, KENT_SI) : "0.5", both ? "\"" : "");
            return 0;
        }
        a[i] = kent_record_item(r, record, kent_twig_child(pair, 0), key,
                                first != KENT_RATIO, first);
        b[i] = kent_record_item(r, record, kent_twig_child(pair, 1), key,
                                second != KENT_RATIO, second);
        if (isnan(a[i]) || isnan(b[i])) return 0;
    }
    return count;
}

bool kent_record_curve(kent_reader *r, kent_record *record, kent_valve_curve *out)
{
    double opening[KENT_VALVE_POINTS];
    double loss[KENT_VALVE_POINTS];
    const size_t count =
        kent_record_pairs(r, record, "characteristic", KENT_RATIO, KENT_RATIO,
                          KENT_VALVE_POINTS, opening, loss);
    if (count > 0 && kent_valve_curve_from_loss(opening, loss, count, out)) return true;
    if (record->sound) {
        kent_record_complain(r, record, "characteristic",
                             "characteristic needs at least two pairs (opening, K), "
                             "openings different and within 0 to 1, K above 0");
    }
    return false;
}

size_t kent_record_creep(kent_reader *r, kent_record *record,
                         kent_creep out[KENT_CREEP_ROWS])
{
    double time[KENT_CREEP_ROWS];
    double compliance[KENT_CREEP_ROWS];
    if (!kent_record_has(record, "creep")) return 0;
    const size_t count =
        kent_record_pairs(r, record, "creep", KENT_TIME, KENT_COMPLIANCE,
                          KENT_CREEP_ROWS, time, compliance);
    for (size_t i = 0; i < count; i++) {
        if (!(time[i] > (i > 0 ? time[i - 1] : 0.0) && compliance[i] > 0.0)) {
            kent_record_complain(r, record, "creep",
                                 "pair %zu of creep: times must rise from above 0 s, "
                                 "compliances be above 0",
                                 i + 1);
            return 0;
        }
        out[i] = (kent_creep){time[i], compliance[i]};
    }
    return count;
}

/* ---- a soil ---------------------------------------------------------------------- */

static void read_by_depth(kent_reader *r, kent_record *record, kent_soil *soil)
{
    double depth[KENT_DEPTH_ROWS];
    double bearing[KENT_DEPTH_ROWS];
    const char *key = "bearing_by_depth";
    const kent_key *most = kent_key_find("soil", "allowable_bearing");
    const size_t count = kent_record_pairs(r, record, key, KENT_LENGTH, KENT_STRESS,
                                           KENT_DEPTH_ROWS, depth, bearing);
    if (!record->sound) return;
    if (count < 2) {
        kent_record_complain(
            r, record, key,
            "bearing_by_depth needs at least two pairs (depth, "
            "bearing); a bearing for every depth is allowable_bearing");
        return;
    }
    for (size_t i = 0; i < count; i++) {
        if (!(depth[i] > (i > 0 ? depth[i - 1] : 0.0) && bearing[i] >= 0.0)) {
            kent_record_complain(r, record, key,
                                 "pair %zu of bearing_by_depth: depths must rise from "
                                 "above 0 m, bearings not be negative",
                                 i + 1);
            return;
        }
        if (bearing[i] > most->most) {
            char range[80];
            kent_key_range(most, r->system, range, sizeof range);
            kent_record_complain(r, record, key,
                                 "pair %zu of bearing_by_depth: the bearing is out of "
                                 "range; the range is %s",
                                 i + 1, range);
            return;
        }
        soil->by_depth[i] = (kent_depth_row){depth[i], bearing[i]};
    }
    soil->by_depth_count = count;
}

static const struct {
    const char *key;
    kent_bearing_route route;
} ROUTES[] = {{"allowable_bearing", KENT_BEARING_CONSTANT},
              {"bearing_by_depth", KENT_BEARING_BY_DEPTH},
              {"bearing_gradient", KENT_BEARING_GRADIENT},
              {"passive_share", KENT_BEARING_PASSIVE}};

enum { ROUTES_COUNT = sizeof ROUTES / sizeof ROUTES[0] };

static bool states_route(const kent_soil *soil, kent_bearing_route route)
{
    switch (route) {
    case KENT_BEARING_CONSTANT:
        return !isnan(soil->allowable_bearing);
    case KENT_BEARING_BY_DEPTH:
        return soil->by_depth_count > 0;
    case KENT_BEARING_GRADIENT:
        return !isnan(soil->bearing_gradient);
    case KENT_BEARING_PASSIVE:
        return !isnan(soil->passive_share);
    }
    return false;
}

/* Which of several bearings decides: the words of bearing_route stand in the order of
 * ROUTES. */
static void read_route(kent_reader *r, kent_record *record, kent_soil *soil)
{
    const int route = kent_record_field(record, "bearing_route")->index;

    if (route < 0 || !record->sound) return;
    soil->route = ROUTES[route].route;
    if (states_route(soil, soil->route)) return;
    kent_record_complain(r, record, "bearing_route",
                         "bearing_route names a bearing that is not given; give %s, or "
                         "name another",
                         ROUTES[route].key);
}

/* The bearings that are given replace whatever *soil had, and the factor inside goes
 * with the bearing it was inside of. */
static void read_bearing(kent_reader *r, kent_record *record, kent_soil *soil)
{
    const bool told = kent_record_has(record, "bearing_route");
    const char *first = NULL;
    for (size_t i = 0; i < ROUTES_COUNT; i++) {
        if (!kent_record_has(record, ROUTES[i].key)) continue;
        if (first && !told) {
            kent_record_complain(r, record, ROUTES[i].key,
                                 "%s and %s are both given; say by bearing_route which "
                                 "decides, or keep one",
                                 first, ROUTES[i].key);
            return;
        }
        if (!first) soil->route = ROUTES[i].route;
        first = ROUTES[i].key;
    }
    if (first) {
        soil->factor_inside = 1.0;
        soil->allowable_bearing = kent_record_number(record, "allowable_bearing");
        soil->bearing_gradient = kent_record_number(record, "bearing_gradient");
        soil->passive_share = kent_record_number(record, "passive_share");
        soil->by_depth_count = 0;
        if (kent_record_has(record, "bearing_by_depth")) {
            read_by_depth(r, record, soil);
        }
    }
    read_route(r, record, soil);
}

static int trench_of(const char *word)
{
    for (int i = 0; word && i < KENT_TRENCHES; i++) {
        if (strcmp(word, kent_trench_word(i)) == 0) return i;
    }
    return -1;
}

static void read_passive_ratios(kent_reader *r, kent_record *record, kent_soil *soil)
{
    const char *key = "passive_ratios";
    const kent_twig *list = kent_record_field(record, key)->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    bool seen[KENT_TRENCHES] = {false};
    for (size_t i = 0; i < count; i++) {
        const kent_twig *pair = kent_twig_child(list, i);
        const bool is_pair =
            kent_twig_type_of(pair) == KENT_TWIG_LIST && kent_twig_count(pair) == 2;
        const int trench =
            is_pair ? trench_of(kent_twig_text(kent_twig_child(pair, 0))) : -1;
        const double ratio = is_pair ? kent_twig_number(kent_twig_child(pair, 1)) : NAN;
        if (trench < 0 || !(ratio >= 0.0 && ratio <= 1.0)) {
            kent_record_complain(r, record, key,
                                 "element %zu of passive_ratios must be a pair of a "
                                 "trench, type-1 to type-5, and a ratio from 0.0 to "
                                 "1.0, as ( \"type-3\", 0.4 )",
                                 i + 1);
            return;
        }
        if (seen[trench]) {
            kent_record_complain(r, record, key,
                                 "passive_ratios names \"%s\" twice; keep one",
                                 kent_trench_word(trench));
            return;
        }
        seen[trench] = true;
        soil->passive_by_trench[trench] = ratio;
    }
}

/* How a base holds on to soil: the one that is given takes the other's place. */
static void read_base(kent_reader *r, kent_record *record, kent_soil *soil)
{
    const bool friction = kent_record_has(record, "base_friction");
    const bool cohesion = kent_record_has(record, "base_cohesion");
    if (friction && cohesion) {
        kent_record_complain(r, record, "base_cohesion",
                             "base_friction and base_cohesion are both given; keep the "
                             "one that holds concrete on this soil");
        return;
    }
    if (!friction && !cohesion) return;
    soil->base_friction = kent_record_number(record, "base_friction");
    soil->base_cohesion = kent_record_number(record, "base_cohesion");
}

static void read_wall_friction(kent_reader *r, kent_record *record, kent_soil *soil)
{
    if (!kent_record_has(record, "wall_friction")) return;
    soil->wall_friction = kent_record_number(record, "wall_friction");
    if (record->sound && !(soil->wall_friction <= soil->friction_angle)) {
        kent_record_complain(r, record, "wall_friction",
                             isnan(soil->friction_angle)
                                 ? "wall_friction needs friction_angle, of which it is "
                                   "a part"
                                 : "wall_friction is above friction_angle; soil slides "
                                   "within itself first: give at most that");
    } else if (record->sound && isnan(soil->passive_share)) {
        kent_record_complain(r, record, "wall_friction",
                             "wall_friction is of the passive pressure, which no "
                             "bearing goes by; give passive_share, or leave it out");
    }
}

/* What is no natural ground is not relied on unless the case itself says otherwise. */
static void read_nature(kent_record *record, kent_soil *soil)
{
    const int nature = kent_record_field(record, "nature")->index;
    if (nature >= 0) soil->nature = (kent_nature)nature;
    const bool doubted = soil->unreliable || soil->nature != KENT_NATURAL;
    soil->unreliable = kent_record_switch(record, "unreliable", doubted);
}

void kent_record_soil(kent_reader *r, kent_record *record, kent_soil *soil)
{
    read_bearing(r, record, soil);
    read_passive_ratios(r, record, soil);
    replace(record, "factor_inside", &soil->factor_inside);
    replace(record, "vertical_bearing", &soil->vertical_bearing);
    read_base(r, record, soil);
    replace(record, "unit_weight", &soil->unit_weight);
    replace(record, "friction_angle", &soil->friction_angle);
    replace(record, "cohesion", &soil->cohesion);
    replace(record, "friction_ratio", &soil->friction_ratio);
    replace(record, "adhesion_ratio", &soil->adhesion_ratio);
    replace(record, "passive_ratio", &soil->passive_ratio);
    read_wall_friction(r, record, soil);
    read_nature(record, soil);
}

bool kent_soil_has_bearing(const kent_soil *soil)
{
    return soil->route != KENT_BEARING_CONSTANT || !isnan(soil->allowable_bearing);
}
