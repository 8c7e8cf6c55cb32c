/* Tests, levels and factors of the loads. */
#include "kent_case_internal.h"

#include <assert.h>
#include <math.h>

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
}
