/* Factors: NIST Special Publication 811 (2008), Thompson and Taylor, appendix B, and
 * the definitions it rests on (foot 0.3048 m, pound 0.45359237 kg, US gallon 231 in3,
 * standard gravity 9.80665 m/s2). The Imperial gallon, 4.54609 L, is the UK Weights and
 * Measures Act 1985. Head of water at 1000 kg/m3: common practice, no source. */
#include "kent_units.h"
#include "kent_alloc_fail.h"
#include "kent_check.h"

#include <locale.h>
#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static kent_units *units;

static int open_units(void **state)
{
    (void)state;
    kent_error err = {0};
    return kent_units_new(&units, &err) != KENT_OK;
}

static int close_units(void **state)
{
    (void)state;
    kent_units_free(units);
    return 0;
}

static double read_si(const char *text, kent_kind kind)
{
    double si = NAN;
    kent_error err = {0};
    if (kent_units_read(units, text, kind, &si, &err) != KENT_OK) {
        print_error("'%s': %s\n", text, err.what);
    }
    assert_string_equal(err.what, "");
    return si;
}

typedef struct reading {
    const char *text;
    kent_kind kind;
    double si;
} reading;

static void assert_readings(const reading *rows, size_t count)
{
    for (size_t i = 0; i < count; i++) {
        const double got = read_si(rows[i].text, rows[i].kind);
        if (!(fabs(got - rows[i].si) <= 1e-14 * fabs(rows[i].si))) {
            print_error("'%s'\n", rows[i].text);
        }
        assert_close(got, rows[i].si, 1e-14);
        assert_close(read_si(rows[i].text, rows[i].kind), got,
                     0.0); /* from the cache */
    }
}

#define COUNT(rows) (sizeof(rows) / sizeof(rows)[0])

static void short_forms_of_flow_have_their_exact_factors(void **state)
{
    (void)state;
    const reading rows[] = {
        {"1 gpm", KENT_FLOW, 3.785411784e-3 / 60.0},
        {"1 gal/min", KENT_FLOW, 3.785411784e-3 / 60.0}, /* not the gal of gravity */
        {"1 gallon/min", KENT_FLOW, 3.785411784e-3 / 60.0},
        {"1 US_gallon/min", KENT_FLOW, 3.785411784e-3 / 60.0},
        {"1 igpm", KENT_FLOW, 4.54609e-3 / 60.0},
        {"1 imperial_gallon/min", KENT_FLOW, 4.54609e-3 / 60.0},
        {"1 mgd", KENT_FLOW, 3785.411784 / 86400.0},
        {"1 MGD", KENT_FLOW, 3785.411784 / 86400.0},
        {"1 Ml/d", KENT_FLOW, 1000.0 / 86400.0},
        {"1 ML/d", KENT_FLOW, 1000.0 / 86400.0},
        {"1 MLD", KENT_FLOW, 1000.0 / 86400.0},
        {"1 cfs", KENT_FLOW, 0.028316846592},
        {"1 ft3/s", KENT_FLOW, 0.028316846592},
        {"300 L/s", KENT_FLOW, 0.3},
        {"300 l/s", KENT_FLOW, 0.3},
        {"36 m3/h", KENT_FLOW, 0.01},
    };
    assert_readings(rows, COUNT(rows));
}

static void short_forms_of_pressure_and_stress_have_their_exact_factors(void **state)
{
    (void)state;
    const double pound = 4.4482216152605; /* N */
    const reading rows[] = {
        {"1 psi", KENT_PRESSURE, pound / 0.00064516},
        {"1 psig", KENT_PRESSURE, pound / 0.00064516},
        {"1 ksi", KENT_MODULUS, 1000.0 * pound / 0.00064516},
        {"1 psf", KENT_STRESS, pound / 0.09290304},
        {"1 ksf", KENT_STRESS, 1000.0 * pound / 0.09290304},
        {"1 kgf/cm2", KENT_PRESSURE, 98066.5},
        {"1 bar", KENT_PRESSURE, 1e5},
        {"1 barg", KENT_PRESSURE, 1e5},
        {"1 MPa", KENT_PRESSURE, 1e6},
        {"1 N/mm2", KENT_PRESSURE, 1e6},
        {"1 1/ksi", KENT_COMPLIANCE, 0.00064516 / (1000.0 * pound)},
        {"1.057e-10 1/Pa", KENT_COMPLIANCE, 1.057e-10},
        {"1 1/MPa", KENT_COMPLIANCE, 1e-6},
        {"1 m head", KENT_PRESSURE, 9806.65},
        {"1 ft head", KENT_PRESSURE, 2989.06692},
        {"1 mH2O", KENT_PRESSURE, 9806.65}, /* not a thousandth of an H2O */
        {"1 ftH2O", KENT_PRESSURE, 2989.06692},
        {"1 ft_H2O", KENT_PRESSURE, 2989.06692},
    };
    assert_readings(rows, COUNT(rows));
}

static void other_short_forms_have_their_exact_factors(void **state)
{
    (void)state;
    const double pound = 4.4482216152605; /* N */
    const reading rows[] = {
        {"1 lbf", KENT_FORCE, pound},
        {"1 kip", KENT_FORCE, 1000.0 * pound},
        {"1 kgf", KENT_FORCE, 9.80665},
        {"1 daN", KENT_FORCE, 10.0},
        {"1 pcf", KENT_UNIT_WEIGHT, pound / 0.028316846592},
        {"1 lbf/ft3", KENT_UNIT_WEIGHT, pound / 0.028316846592},
        {"1 psf/ft", KENT_UNIT_WEIGHT, pound / 0.028316846592},
        {"1 lbf/ft", KENT_FORCE_PER_LENGTH, pound / 0.3048},
        {"1 lb/ft3", KENT_DENSITY, 0.45359237 / 0.028316846592},
        {"1 yd3", KENT_VOLUME, 0.764554857984},
        {"1 gallon", KENT_VOLUME, 3.785411784e-3},
        {"1 cP", KENT_VISCOSITY, 1e-3},
        {"1 mPa s", KENT_VISCOSITY, 1e-3},
        {"1 mPa.s", KENT_VISCOSITY, 1e-3},
        {"180 deg", KENT_ANGLE, 3.14159265358979323846},
        {"180\xC2\xB0", KENT_ANGLE, 3.14159265358979323846},
        {"0.39 rad", KENT_ANGLE, 0.39},
        {"60 rpm", KENT_ROTATION, 6.283185307179586}, /* a turn is 2 pi rad */
        {"1480 RPM", KENT_ROTATION, 1480.0 * 0.10471975511965978},
        {"1480 rev/min", KENT_ROTATION, 1480.0 * 0.10471975511965978},
        {"155 rad/s", KENT_ROTATION, 155.0},
        {"1 lb ft2", KENT_INERTIA, 0.45359237 * 0.09290304},
        {"1 slug ft2", KENT_INERTIA, 4.4482216152605 * 0.3048},
        {"30 kgf m s2", KENT_INERTIA, 30.0 * 9.80665},
        {"1 kW", KENT_POWER, 1000.0},
        {"1 hp", KENT_POWER, 550.0 * 0.3048 * 4.4482216152605},
        {"150 %", KENT_RATIO, 1.5},
        {"1.5", KENT_RATIO, 1.5},
        {"-1.5", KENT_RATIO, -1.5},
        {"2 m/m", KENT_RATIO, 2.0},
    };
    assert_readings(rows, COUNT(rows));
}

static void a_temperature_is_a_point_on_its_scale(void **state)
{
    (void)state;
    assert_within(read_si("0 degC", KENT_TEMPERATURE), 273.15, 1e-10);
    assert_within(read_si("12 degC", KENT_TEMPERATURE), 285.15, 1e-10);
    assert_within(read_si("32 degF", KENT_TEMPERATURE), 273.15, 1e-10);
    assert_within(read_si("54 degF", KENT_TEMPERATURE), (54.0 + 459.67) / 1.8, 1e-10);
    assert_within(read_si("285 K", KENT_TEMPERATURE), 285.0, 1e-10);
}

static void numbers_may_be_written_as_people_write_them(void **state)
{
    (void)state;
    const reading rows[] = {
        {"600 mm", KENT_LENGTH, 0.6},
        {"600mm", KENT_LENGTH, 0.6},
        {"  600 mm  ", KENT_LENGTH, 0.6},
        {"600\xC2\xA0mm", KENT_LENGTH, 0.6}, /* a no-break space */
        {"+0.6 m", KENT_LENGTH, 0.6},
        {"-0.6 m", KENT_LENGTH, -0.6},
        {".6 m", KENT_LENGTH, 0.6},
        {"6e-1 m", KENT_LENGTH, 0.6},
        {"6.0E-1 m", KENT_LENGTH, 0.6},
        {"24e6 psi", KENT_MODULUS, 24e6 * 4.4482216152605 / 0.00064516},
        {"9.81 m/s^2", KENT_ACCELERATION, 9.81},
        {"9.81 m s-2", KENT_ACCELERATION, 9.81},
        {"9.81 m/s/s", KENT_ACCELERATION, 9.81},
        {"9.81 m s**-2", KENT_ACCELERATION, 9.81},
        {"3 m3/m2", KENT_LENGTH, 3.0},
    };
    assert_readings(rows, COUNT(rows));
}

static void assert_refused(const char *text, kent_kind kind, const char *because)
{
    double si = 12.5;
    kent_error err = {0};
    const kent_status status = kent_units_read(units, text, kind, &si, &err);
    if (status == KENT_OK || !strstr(err.what, because)) {
        print_error("'%s' gave %g, \"%s\"\n", text, si, err.what);
    }
    assert_int_equal(status, KENT_E_INPUT);
    assert_non_null(strstr(err.what, because));
    assert_string_equal(err.where, "");
    assert_true(si == 12.5); /* left alone */
}

static void every_kind_refuses_the_examples_of_every_other(void **state)
{
    (void)state;
    size_t refused = 0;
    for (int a = 0; a < KENT_KIND_COUNT; a++) {
        for (int b = 0; b < KENT_KIND_COUNT; b++) {
            for (int s = KENT_SI; s <= KENT_US; s++) {
                const char *text = kent_kind_example((kent_kind)b, (kent_system)s);
                if (strcmp(kent_kind_si((kent_kind)a), kent_kind_si((kent_kind)b)) ==
                    0) {
                    const bool scale = a == KENT_WARMING && b == KENT_TEMPERATURE;
                    if (scale) {
                        assert_refused(text, KENT_WARMING, "is a place on a scale");
                    } else {
                        (void)read_si(text, (kent_kind)a);
                    }
                    continue;
                }
                assert_refused(text, (kent_kind)a, "for instance");
                refused++;
            }
        }
    }
    assert_true(refused > 500);
}

static void the_wrong_kind_is_named_with_the_right_one_and_examples(void **state)
{
    (void)state;
    assert_refused(
        "300 kPa", KENT_FLOW,
        "'300 kPa' is a pressure where a flow belongs; for instance \"300 L/s\" "
        "or \"4800 gpm\"");
    assert_refused("5 %", KENT_ANGLE, "'5 %' is a ratio where an angle belongs");
    assert_refused("1 deg", KENT_RATIO, "is an angle where a ratio belongs");
    assert_refused("92 m head", KENT_LENGTH, "is a pressure where a length belongs");
    assert_refused("120 lb/ft3", KENT_UNIT_WEIGHT,
                   "is a density where a unit weight belongs");
    assert_refused("1 gal", KENT_ACCELERATION, "is a volume where an acceleration");
}

static void units_that_only_look_alike_are_refused(void **state)
{
    (void)state;
    assert_refused("3 s/m3", KENT_FLOW, "is not a flow");     /* a reciprocal */
    assert_refused("3 1/m", KENT_LENGTH, "is not a length");  /* another */
    assert_refused("24.67 Hz", KENT_RATIO, "is not a ratio"); /* turns a second */
    assert_refused("24.67 Hz", KENT_ANGLE, "is not an angle");
    assert_refused("5 rpm", KENT_ANGLE, "is a rotation speed where an angle belongs");
    assert_refused("24.67 Hz", KENT_ROTATION, "is not a rotation speed");
    assert_refused("1480 1/min", KENT_ROTATION, "is not a rotation speed");
    assert_refused("30 kgf m^2", KENT_INERTIA, "is not a moment of inertia"); /* GD2 */
    assert_refused("5600 lb", KENT_FORCE, "is not a force");          /* a mass */
    assert_refused("12 C", KENT_TEMPERATURE, "is not a temperature"); /* coulomb */
    assert_refused("15 mpa", KENT_PRESSURE, "is not a unit");
    assert_refused("1 N m", KENT_FORCE, "is a moment where a force belongs");
    assert_refused("1 psi head", KENT_PRESSURE, "is not a pressure");
    assert_refused("1 m rad", KENT_LENGTH, "is not a length");
}

/* 1 K is 1.8 degrees of Rankine and of Fahrenheit (NIST SP 811, B.8). */
static void a_change_of_temperature_is_no_temperature(void **state)
{
    (void)state;
    assert_within(read_si("12 K", KENT_WARMING), 12.0, 1e-12);
    assert_within(read_si("18 degR", KENT_WARMING), 10.0, 1e-12);
    assert_within(read_si("1.8e-6 1/K", KENT_EXPANSION), 1.8e-6, 1e-18);
    assert_within(read_si("1e-6 1/degR", KENT_EXPANSION), 1.8e-6, 1e-18);
    assert_refused(
        "12 degC", KENT_WARMING,
        "'12 degC' is a place on a scale of temperatures where a change of "
        "temperature belongs; write for instance \"12 K\" or \"22 degR\": 1 K "
        "is 1 degC of change, 1 degR 1 degF");
    assert_refused("20 degF", KENT_WARMING, "is a place on a scale");
}

static void absolute_pressures_are_refused_by_name(void **state)
{
    (void)state;
    assert_refused("14.7 psia", KENT_PRESSURE, "'psia' in '14.7 psia' is an absolute");
    assert_refused("14.7 psia", KENT_PRESSURE, "pressures are gauge");
    assert_refused("10 bar(a)", KENT_PRESSURE, "is an absolute");
    assert_refused("150 psi a", KENT_PRESSURE, "is an absolute");
    assert_refused("10 bar abs", KENT_PRESSURE, "is an absolute");
    assert_refused("10 kPa (abs)", KENT_PRESSURE, "is an absolute");
    assert_refused("1 bara", KENT_PRESSURE, "absolute");
}

static void a_bare_number_is_only_a_ratio(void **state)
{
    (void)state;
    for (int k = 0; k < KENT_KIND_COUNT; k++) {
        if (k != KENT_RATIO) {
            assert_refused("1", (kent_kind)k, "'1' has no unit; write");
        }
    }
}

static void wrong_looking_texts_are_refused(void **state)
{
    (void)state;
    assert_refused("1,4 m", KENT_LENGTH, "has a comma");
    assert_refused("1,400 m", KENT_LENGTH, "has a comma");
    assert_refused("1,5", KENT_RATIO, "has a comma");
    assert_refused("\u22124 m", KENT_LENGTH, "no minus sign");
    assert_refused("\u20134 m", KENT_LENGTH, "no minus sign");
    const char *const no_number[] = {
        "",      " ",     "m",   "nan m", "NAN",    "inf m", "INF",  "- 5 m",
        "--5 m", "+-5 m", ". m", "e5 m",  "five m", "~5 m",  "=5 m", "/2 m"};
    for (size_t i = 0; i < COUNT(no_number); i++) {
        assert_refused(no_number[i], KENT_LENGTH, "does not start with a number");
    }
    const char *const no_unit[] = {
        "0x10 m",       "5 furlop", "12 ft 6 in", "12' 6\"", "5'",           "5\"",
        "600 2 m",      "2 x 3 m",  "5 m 3",      "5 m.3",   "5 m + 2 m",    "5 m, 2 m",
        "5 m since 5",  "5 m @ 2",  "5 m)",       "5 (m",    "5 lg(re 1 m)", "5 m;",
        "5 m # length", "5 m/",     "5 2",        "5 -3 m",  "5 m\nm 2",     "5 [m]",
        "5 head",       "5 m**",    "5 1 m",
    };
    for (size_t i = 0; i < COUNT(no_unit); i++) {
        assert_refused(no_unit[i], KENT_LENGTH, "is not a unit");
        assert_refused(no_unit[i], KENT_AREA, "is not a unit");
    }
    assert_refused("1/2 m", KENT_LENGTH, "is not a unit");
    assert_refused("1e999 m", KENT_LENGTH, "too large");
    assert_refused("1e308 km", KENT_LENGTH, "too large");
}

static void a_very_long_text_is_refused_and_cut(void **state)
{
    (void)state;
    char text[5000];
    memset(text, 'm', sizeof text - 1);
    text[0] = '5';
    text[sizeof text - 1] = '\0';
    assert_refused(text, KENT_LENGTH, "write for instance \"1.4 m\" or \"4.5 ft\"");
}

static void every_kind_reads_its_examples_and_shows_them_again(void **state)
{
    (void)state;
    for (int k = 0; k < KENT_KIND_COUNT; k++) {
        for (int s = KENT_SI; s <= KENT_US; s++) {
            const kent_kind kind = (kent_kind)k;
            const kent_display shown = kent_units_display(kind, (kent_system)s);
            assert_true(shown.decimals >= 0 && shown.decimals <= 6);
            (void)read_si(kent_kind_example(kind, (kent_system)s), kind);
            /* What is shown, read again with its unit, is what it was. */
            for (int i = 0; i <= 8; i++) {
                const double si = -40.0 + 55.0 * i;
                char text[80];
                (void)snprintf(text, sizeof text, "%.17g %s",
                               kent_units_shown(kind, (kent_system)s, si), shown.unit);
                assert_within(read_si(text, kind), si, 1e-11);
            }
        }
    }
}

/* A machine for builds has none: one is made from the sources of package `locales`. */
static const char *make_comma_locale(void)
{
    static const char MAKE[] =
        "localedef -i de_DE -f UTF-8 '" KENT_BINARY_DIR "/de_DE.UTF-8' >/dev/null 2>&1";
    if (system(MAKE) != 0) return NULL; /* NOLINT: a test's own command */
    if (setenv("LOCPATH", KENT_BINARY_DIR, 1) != 0) return NULL;
    return setlocale(LC_ALL, "de_DE.UTF-8");
}

static void a_comma_locale_changes_nothing(void **state)
{
    (void)state;
    const char *const names[] = {"de_DE.UTF-8", "fr_FR.UTF-8", "de_DE.utf8",
                                 "nl_NL.UTF-8"};
    const char *set = NULL;
    for (size_t i = 0; i < COUNT(names) && !set; i++) {
        set = setlocale(LC_ALL, names[i]);
    }
    if (!set) set = make_comma_locale();
    assert_non_null(set); /* from package `locales` */
    kent_error err = {0};
    kent_units *fresh = NULL;
    double si = NAN;
    const kent_status made = kent_units_new(&fresh, &err);
    const kent_status got =
        made == KENT_OK ? kent_units_read(fresh, "1.5 gpm", KENT_FLOW, &si, &err)
                        : made;
    kent_units_free(fresh);
    const bool had_comma = strcmp(localeconv()->decimal_point, ",") == 0;
    (void)setlocale(LC_ALL, "C");
    assert_true(had_comma); /* else nothing was tested */
    assert_int_equal(got, KENT_OK);
    assert_close(si, 1.5 * 3.785411784e-3 / 60.0, 1e-14);
}

static void many_spellings_are_no_trouble(void **state)
{
    (void)state;
    for (int i = 0; i < 2000; i++) {
        char text[4096];
        (void)snprintf(text, sizeof text, "%d.5 %*sm", i, i, "");
        assert_close(read_si(text, KENT_LENGTH), i + 0.5, 1e-15);
        (void)snprintf(text, sizeof text, "%d.5 m%*s/ s", i, i, "");
        assert_close(read_si(text, KENT_SPEED), i + 0.5, 1e-15);
    }
}

static int read_in_want(void *context)
{
    kent_error err = {0};
    kent_units *fresh = NULL;
    double si = NAN;
    (void)context;
    kent_status status = kent_units_new(&fresh, &err);
    for (int i = 0; i < 3 && status == KENT_OK; i++) {
        const char *const texts[] = {"300 L/s", "4800 gpm", "300 L/s"};
        status = kent_units_read(fresh, texts[i], KENT_FLOW, &si, &err);
    }
    kent_units_free(fresh);
    if (status != KENT_OK) assert_int_equal(status, KENT_E_NOMEM);
    return status != KENT_OK;
}

static void without_memory_it_says_so(void **state)
{
    (void)state;
    assert_true(kent_allocations_needed(read_in_want, NULL) > 5);
}

static void without_its_database_it_says_where_to_look(void **state)
{
    (void)state;
    kent_error err = {0};
    kent_units *fresh = NULL;
    assert_int_equal(setenv("UDUNITS2_XML_PATH", "/nowhere/units.xml", 1), 0);
    const kent_status status = kent_units_new(&fresh, &err);
    assert_int_equal(unsetenv("UDUNITS2_XML_PATH"), 0);
    assert_int_equal(status, KENT_E_IO);
    assert_null(fresh);
    assert_non_null(strstr(err.what, "UDUNITS2_XML_PATH"));
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(short_forms_of_flow_have_their_exact_factors),
        cmocka_unit_test(short_forms_of_pressure_and_stress_have_their_exact_factors),
        cmocka_unit_test(other_short_forms_have_their_exact_factors),
        cmocka_unit_test(a_temperature_is_a_point_on_its_scale),
        cmocka_unit_test(numbers_may_be_written_as_people_write_them),
        cmocka_unit_test(every_kind_refuses_the_examples_of_every_other),
        cmocka_unit_test(the_wrong_kind_is_named_with_the_right_one_and_examples),
        cmocka_unit_test(units_that_only_look_alike_are_refused),
        cmocka_unit_test(a_change_of_temperature_is_no_temperature),
        cmocka_unit_test(absolute_pressures_are_refused_by_name),
        cmocka_unit_test(a_bare_number_is_only_a_ratio),
        cmocka_unit_test(wrong_looking_texts_are_refused),
        cmocka_unit_test(a_very_long_text_is_refused_and_cut),
        cmocka_unit_test(every_kind_reads_its_examples_and_shows_them_again),
        cmocka_unit_test(a_comma_locale_changes_nothing),
        cmocka_unit_test(many_spellings_are_no_trouble),
        cmocka_unit_test(without_memory_it_says_so),
        cmocka_unit_test(without_its_database_it_says_where_to_look),
    };
    return cmocka_run_group_tests(tests, open_units, close_units);
}
