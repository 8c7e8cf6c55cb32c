/* Tests, levels and factors of the loads. */
#include "kent_case_internal.h"

#include <assert.h>
#include <math.h>

/* In the order of kent_case_kind. */
static const char *const FACTORS[] = {"test",        "static",    "steady",
                                      "shut_off",    "recurring", "occasional",
                                      "exceptional", "suction"};

void kent_fill_loads(kent_filling *f)
{
    kent_record r;
    kent_record factors;
    kent_loads *l = &f->model->loads;
    const bool there = kent_fill_group(f, &f->root, "loads", &r);
    const double all = there ? kent_record_number(&r, "safety_factor") : (double)NAN;
    const bool each = there && kent_fill_group(f, &r, "factors", &factors);

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
    if (!there) return;
    l->place = r.place;
    l->test_pressure = kent_record_number(&r, "test_pressure");
    l->test_gauge = kent_record_field(&r, "test_gauge_at")->index;
    l->static_level = kent_record_number(&r, "static_level");
    const bool network = f->model->pipe_count > 0;
    if (r.sound && kent_record_has(&r, "test_pressure") && l->test_gauge < 0 &&
        network) {
        kent_record_complain(&f->reader, &r, "test_pressure",
                             "test_pressure needs test_gauge_at, the point where it is "
                             "read");
    }
    if (r.sound && !kent_record_has(&r, "test_pressure") && l->test_gauge >= 0) {
        kent_record_complain(
            &f->reader, &r, "test_gauge_at",
            "test_gauge_at needs test_pressure, the pressure read there");
    }
}
