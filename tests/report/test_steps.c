#include "kent_check.h"
#include "kent_steps.h"
#include "kent_worked.h"

#include <math.h>
#include <string.h>

static kent_derivation some_steps(void)
{
    kent_derivation d = {0};
    kent_derivation_heading(&d, "A bend");
    kent_derivation_put(&d, "p", 1.2e6, KENT_PRESSURE, KENT_GIVEN, "gauge pressure");
    kent_derivation_put(&d, "D", 0.635, KENT_DIAMETER, KENT_CATALOGUE, "seal");
    kent_derivation_put(&d, "angle", 0.3927, KENT_ANGLE, KENT_COMPUTED, "turn");
    const double area = 3.14159265358979323846 / 4.0 * 0.635 * 0.635;
    kent_derivation_work(&d, "A", area, KENT_AREA, "pi/4*D^2", "8.2", "area");
    kent_derivation_work(&d, "T", 2.0 * 1.2e6 * area * sin(0.3927 / 2.0), KENT_FORCE,
                         "2*p*A*sin(angle/2)", "8.9", "resultant");
    kent_derivation_work(&d, "S", 4.0 * 1.2e6 * area, KENT_FORCE,
                         "p*A + p*A + p*A + p*A + min(p*A, 1e9) - max(p*A, 0)", "",
                         "a sum too long for one line of a hundred columns");
    return d;
}

static void every_printed_line_can_be_worked_out_again(void **state)
{
    (void)state;
    kent_derivation d = some_steps();
    static const size_t LIMITS[] = {0, 100, 60, 40};
    for (size_t i = 0; i < sizeof LIMITS / sizeof LIMITS[0]; i++) {
        for (kent_system units = KENT_SI; units <= KENT_US; units++) {
            kent_text out = {0};
            kent_steps_print(&d, units, LIMITS[i], &out);
            assert_false(out.failed);
            assert_int_equal(kent_worked_check(kent_text_of(&out)), 3);
            kent_text_clear(&out);
        }
    }
    kent_derivation_clear(&d);
}

static void no_line_is_longer_than_asked(void **state)
{
    (void)state;
    kent_derivation d = some_steps();
    kent_text out = {0};
    kent_steps_print(&d, KENT_SI, 60, &out);
    for (const char *s = kent_text_of(&out); *s != '\0';) {
        const size_t length = strcspn(s, "\n");
        assert_true(length <= 60);
        s += length + 1;
    }
    kent_text_clear(&out);
    kent_derivation_clear(&d);
}

static void the_forms_are_the_ones_written_down(void **state)
{
    (void)state;
    kent_derivation d = some_steps();
    kent_text out = {0};
    kent_steps_print(&d, KENT_SI, 100, &out);
    const char *text = kent_text_of(&out);
    assert_non_null(strstr(text, "A bend\n"));
    assert_non_null(
        strstr(text, "  p = 1200.00 kPa             gauge pressure (given)\n"));
    assert_non_null(strstr(text, "  A = pi/4*D^2 = pi/4*0.635000^2 = 0.316692 m2   "
                                 "(eq. 8.2)   area\n"));
    kent_text_clear(&out);
    kent_derivation_clear(&d);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_printed_line_can_be_worked_out_again),
        cmocka_unit_test(no_line_is_longer_than_asked),
        cmocka_unit_test(the_forms_are_the_ones_written_down),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
