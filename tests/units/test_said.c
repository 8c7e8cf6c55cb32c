#include "kent_check.h"
#include "kent_said.h"

static void a_value_is_said_in_the_units_asked_for(void **state)
{
    (void)state;
    static const struct {
        kent_kind kind;
        double value; /* SI */
        const char *si, *us;
    } CASES[] = {
        {KENT_LENGTH, 120.37, "120.37 m", "394.91 ft"},
        {KENT_PRESSURE, 11.92e5, "11.92 bar", "172.9 psi"},
        {KENT_STRESS, 150e3, "150.0 kPa", "3133 psf"},
        {KENT_FORCE, 59.9e3, "59.9 kN", "13.5 kip"},
        {KENT_AREA, 1.701, "1.701 m²", "18.31 ft²"},
        {KENT_VOLUME, 0.4, "0.40 m³", "0.52 yd³"},
        {KENT_ANGLE, 0.0402, "2.3°", "2.3°"},
        {KENT_RATIO, 1.5, "1.500", "1.500"},
    };
    for (size_t i = 0; i < sizeof CASES / sizeof CASES[0]; i++) {
        const double value = CASES[i].value;
        assert_string_equal(kent_said_of(CASES[i].kind, KENT_SI, value).s, CASES[i].si);
        assert_string_equal(kent_said_of(CASES[i].kind, KENT_US, value).s, CASES[i].us);
    }
}

static void a_distance_may_be_said_in_whole_units(void **state)
{
    (void)state;
    assert_string_equal(kent_said_whole(KENT_LENGTH, KENT_SI, 120.37).s, "120 m");
    assert_string_equal(kent_said_whole(KENT_LENGTH, KENT_US, 120.37).s, "395 ft");
    assert_string_equal(kent_said_whole(KENT_LENGTH, KENT_SI, -0.2).s, "0 m");
}

static void a_station_is_said_as_it_is_written(void **state)
{
    (void)state;
    const double foot = 0.3048; /* m */
    assert_string_equal(kent_said_station(KENT_SI, 3700.0).s, "3+700");
    assert_string_equal(kent_said_station(KENT_SI, 4000.06).s, "4+000.06");
    assert_string_equal(kent_said_station(KENT_SI, 999.999).s, "1+000");
    assert_string_equal(kent_said_station(KENT_SI, -12.5).s, "-0+012.5");
    assert_string_equal(kent_said_station(KENT_SI, -0.001).s, "0+000");
    assert_string_equal(kent_said_station(KENT_US, 1234.5 * foot).s, "12+34.5");
    assert_string_equal(kent_said_station(KENT_US, 1305.0 * foot).s, "13+05");
    assert_string_equal(kent_said_station(KENT_SI, 1e15).s, "1000000000000000.00 m");
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_value_is_said_in_the_units_asked_for),
        cmocka_unit_test(a_distance_may_be_said_in_whole_units),
        cmocka_unit_test(a_station_is_said_as_it_is_written),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
