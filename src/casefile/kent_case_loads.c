/* Tests, levels and factors of the loads. */
#include "kent_case_internal.h"

#include <assert.h>
#include <math.h>
#include <stdio.h>
#include <string.h>

/* In the order of kent_case_kind. */
static const char *const FACTORS[] = {"test",        "static",    "steady",
                                      "shut_off",    "recurring", "occasional",
                                      "exceptional", "suction"};

static void fill_factors(kent_filling *f, const kent_record *loads, bool there)
{
    kent_record factors;
    kent_loads *l = &f->model->loads;
    const double all = there ? kent_record_number(loads, "safety_factor") : (double)NAN;
    const bool each = there && kent_fill_group(f, loads, "factors", &factors);

    static_assert(sizeof FACTORS / sizeof FACTORS[0] ==
                      sizeof l->factor / sizeof l->factor[0],
                  "one name for each kind of load case");
    for (size_t i = 0; i < sizeof FACTORS / sizeof FACTORS[0]; i++) {
        l->factor[i] = each ? kent_record_number_or(&factors, FACTORS[i], all) : all;
    }
    if (isnan(all)) {
        kent_fill_assume_value(f, "safety factor", f->model->rules.safety_factor,
                               KENT_RATIO, "not given in loads: the design rules'");
    }
}

/* ---- the test ---------------------------------------------------------------------
 */

/* Keys of loads that one rule alone reads. */
static const struct {
    const char *key, *word; /* the rule as a case names it */
    kent_test_rule rule;
} OF_RULES[] = {{"test_factor", "working-factor", KENT_TEST_FACTOR},
                {"surge_allowance", "EN805-surge-assumed", KENT_TEST_EN805_ASSUMED}};

static void check_rule(kent_filling *f, kent_record *r)
{
    const kent_loads *l = &f->model->loads;
    if (kent_record_has(r, "test_pressure")) {
        kent_record_complain(&f->reader, r, "test_rule",
                             "test_rule and test_pressure are both given; keep one");
    } else if (f->model->pipe_count == 0) {
        kent_record_complain(&f->reader, r, "test_rule",
                             "test_rule works from the pressures along pipes, and the "
                             "case has none; state the pressure of each port");
    } else if (l->test_rule == KENT_TEST_EN805_CALCULATED &&
               f->model->scenario_count == 0) {
        kent_record_complain(&f->reader, r, "test_rule",
                             "\"EN805-surge-calculated\" takes the surge of the "
                             "scenarios, and the case has none; describe them, or take "
                             "\"EN805-surge-assumed\"");
    }
}

static void check_test(kent_filling *f, kent_record *r)
{
    const kent_loads *l = &f->model->loads;
    const bool rule = kent_record_has(r, "test_rule");
    const bool stated = kent_record_has(r, "test_pressure");
    const bool gauge = kent_record_has(r, "test_gauge_at");
    if (rule) check_rule(f, r);
    for (size_t i = 0; r->sound && i < sizeof OF_RULES / sizeof OF_RULES[0]; i++) {
        if (kent_record_has(r, OF_RULES[i].key) && l->test_rule != OF_RULES[i].rule) {
            kent_record_complain(
                &f->reader, r, OF_RULES[i].key,
                "%s is read by test_rule \"%s\" alone; name that rule, "
                "or leave it out",
                OF_RULES[i].key, OF_RULES[i].word);
        }
    }
    if (!r->sound) return;
    if ((rule || stated) && !gauge && f->model->pipe_count > 0) {
        const char *key = rule ? "test_rule" : "test_pressure";
        kent_record_complain(&f->reader, r, key,
                             "%s needs test_gauge_at, the point where %s is read", key,
                             rule ? "the pressure" : "it");
    } else if (!rule && !stated && gauge) {
        kent_record_complain(&f->reader, r, "test_gauge_at",
                             "test_gauge_at needs test_pressure, the pressure read "
                             "there, or test_rule");
    }
}

static void assume_test(kent_filling *f, const kent_record *r)
{
    const kent_loads *l = &f->model->loads;
    if (l->test_rule == KENT_TEST_FACTOR && !kent_record_has(r, "test_factor")) {
        kent_fill_assume_value(f, "test factor", l->test_factor, KENT_RATIO,
                               "test_factor not given");
    }
    if (l->test_rule == KENT_TEST_EN805_ASSUMED &&
        !kent_record_has(r, "surge_allowance")) {
        kent_fill_assume_value(
            f, "surge allowance of the test", l->surge_allowance, KENT_PRESSURE,
            "surge_allowance not given: the least of EN 805, 11.3.2");
    }
}

static void fill_test(kent_filling *f, kent_record *r)
{
    kent_loads *l = &f->model->loads;
    const int rule = kent_record_field(r, "test_rule")->index;
    l->test_rule = rule >= 0 ? (kent_test_rule)(rule + 1) : KENT_TEST_FIXED;
    l->test_pressure = kent_record_number(r, "test_pressure");
    l->test_gauge = kent_record_field(r, "test_gauge_at")->index;
    l->test_factor = kent_record_number_or(r, "test_factor", l->test_factor);
    l->surge_allowance =
        kent_record_number_or(r, "surge_allowance", l->surge_allowance);
    if (!r->sound) return;
    check_test(f, r);
    if (r->sound) assume_test(f, r);
}

/* ---- bearing, area, cooling, waivers ----------------------------------------------
 */

static void fill_increases(kent_filling *f, const kent_record *loads)
{
    kent_record r;
    kent_loads *l = &f->model->loads;
    if (!kent_fill_group(f, loads, "bearing_increase", &r)) return;
    for (size_t i = 0; i < sizeof FACTORS / sizeof FACTORS[0]; i++) {
        if (!kent_record_has(&r, FACTORS[i])) continue;
        l->bearing_increase[i] = kent_record_number(&r, FACTORS[i]);
        kent_notes_add(&f->model->cautions,
                       "soil is let bear %.2f times as much in load cases of kind %s, "
                       "as the case says: that is the soil engineer's to allow",
                       l->bearing_increase[i], FACTORS[i]);
    }
}

static void fill_area(kent_filling *f, kent_record *r)
{
    const kent_model *m = f->model;
    const int area = kent_record_field(r, "thrust_area")->index;
    if (area >= 0) f->model->loads.thrust_area = (kent_thrust_area)area;
    for (size_t i = 0; area == KENT_AREA_NOMINAL && i < m->pipe_count; i++) {
        if (!isnan(m->pipes[i].nominal_size)) continue;
        kent_record_complain(&f->reader, r, "thrust_area",
                             "thrust_area \"nominal\" needs the nominal_size of pipe "
                             "\"%s\"; give it, or take \"outside\"",
                             m->pipes[i].id);
        return;
    }
}

/* What the catalogue says of a pipe that cools, where the case does not. */
static void assume_material(kent_filling *f, const kent_pipe *p)
{
    const kent_material *row = kent_catalogue_material(f->catalogue, p->material);
    const struct {
        const char *what;
        double used, own;
        kent_kind kind;
    } values[] = {
        {"thermal expansion", p->expansion, row ? row->expansion : NAN, KENT_EXPANSION},
        {"long-term modulus", p->long_modulus, row ? row->long_modulus : NAN,
         KENT_MODULUS}};
    for (size_t i = 0; row && i < sizeof values / sizeof values[0]; i++) {
        char what[96];
        char why[260];
        if (isnan(values[i].own) || fabs(values[i].used - values[i].own) > 0.0) {
            continue;
        }
        (void)snprintf(what, sizeof what, "%s of %s", values[i].what, row->id);
        (void)snprintf(why, sizeof why, "catalogue (%s): %s", row->from.status,
                       row->from.source);
        kent_fill_assume_value(f, what, values[i].used, values[i].kind, why);
    }
}

static void fill_cooling(kent_filling *f, kent_record *r)
{
    const kent_model *m = f->model;
    f->model->loads.cooling = kent_record_number(r, "cooling");
    if (!kent_record_has(r, "cooling")) return;
    bool shortens = false;
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *p = &m->pipes[i];
        if (p->joint != KENT_FUSED && p->joint != KENT_WELDED) continue;
        shortens = true;
        if (isnan(p->expansion)) {
            kent_record_complain(&f->reader, r, "cooling",
                                 "cooling needs the expansion of pipe \"%s\", which is "
                                 "fused or welded; give it, or its material",
                                 p->id);
            return;
        }
        assume_material(f, p);
    }
    if (!shortens) {
        kent_notes_add(&f->model->cautions,
                       "cooling is of fused and welded pipe, and the case has none: "
                       "nothing is pulled by it");
    }
}

/* One pair (what, reason). */
static bool fill_waiver(kent_filling *f, kent_record *r, const kent_twig *pair,
                        size_t number, kent_waiver *out)
{
    static const char *const WORDS[] = {"test", "static", "shut-off", "surge"};
    const bool is_pair =
        kent_twig_type_of(pair) == KENT_TWIG_LIST && kent_twig_count(pair) == 2;
    const char *what = is_pair ? kent_twig_text(kent_twig_child(pair, 0)) : NULL;
    const char *reason = is_pair ? kent_twig_text(kent_twig_child(pair, 1)) : NULL;
    bool known = false;
    for (size_t i = 0; what && i < sizeof WORDS / sizeof WORDS[0]; i++) {
        known = known || strcmp(what, WORDS[i]) == 0;
    }
    if (!known || !reason || reason[0] == '\0' ||
        strlen(reason) >= sizeof out->reason) {
        kent_record_complain(
            &f->reader, r, "waived",
            "element %zu of waived must be a pair of a load case, test, "
            "static, shut-off or surge, and the reason, of up to %zu "
            "bytes, as ( \"shut-off\", \"no pump\" )",
            number, sizeof out->reason - 1);
        return false;
    }
    (void)snprintf(out->what, sizeof out->what, "%s", what);
    (void)snprintf(out->reason, sizeof out->reason, "%s", reason);
    out->place = r->place;
    return true;
}

static void fill_waivers(kent_filling *f, kent_record *r)
{
    kent_model *m = f->model;
    const kent_twig *list = kent_record_field(r, "waived")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    if (count == 0) return;
    m->waivers = kent_alloc(count, sizeof *m->waivers);
    if (!m->waivers) {
        f->reader.failed = true;
        return;
    }
    for (size_t i = 0; i < count; i++) {
        kent_waiver *w = &m->waivers[i];
        if (!fill_waiver(f, r, kent_twig_child(list, i), i + 1, w)) return;
        for (size_t k = 0; k < i; k++) {
            if (strcmp(m->waivers[k].what, w->what) != 0) continue;
            kent_record_complain(&f->reader, r, "waived",
                                 "waived names \"%s\" twice; keep one", w->what);
            return;
        }
        m->waiver_count++;
    }
}

/* ---- all --------------------------------------------------------------------------
 */

static void fill_future(kent_filling *f, kent_record *r)
{
    kent_loads *l = &f->model->loads;
    const bool pressure = kent_record_has(r, "future_pressure");
    const bool gauge = kent_record_has(r, "future_gauge_at");
    l->future_pressure = kent_record_number(r, "future_pressure");
    l->future_gauge = kent_record_field(r, "future_gauge_at")->index;
    if (!r->sound) return;
    if (pressure && !gauge) {
        kent_record_complain(
            &f->reader, r, "future_pressure",
            "future_pressure needs future_gauge_at, the point where it "
            "is read");
    } else if (gauge && !pressure) {
        kent_record_complain(&f->reader, r, "future_gauge_at",
                             "future_gauge_at needs future_pressure, the pressure read "
                             "there");
    } else if (pressure && f->model->pipe_count == 0) {
        kent_record_complain(
            &f->reader, r, "future_pressure",
            "future_pressure is of a main with pipes, and the case has "
            "none; state the pressure of each port");
    }
}

void kent_fill_loads(kent_filling *f)
{
    kent_record r;
    const bool there = kent_fill_group(f, &f->root, "loads", &r);
    fill_factors(f, &r, there);
    if (!there) return;
    f->model->loads.place = r.place;
    f->model->loads.static_level = kent_record_number(&r, "static_level");
    fill_test(f, &r);
    fill_future(f, &r);
    fill_increases(f, &r);
    fill_area(f, &r);
    fill_cooling(f, &r);
    fill_waivers(f, &r);
}
