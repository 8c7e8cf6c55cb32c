#include "kent_build.h"
#include "kent_check.h"
#include "kent_shown.h"

#include <math.h>

static const double DEGREE = 3.14159265358979323846 / 180.0;

static void a_station_rounds_before_it_splits(void **state)
{
    (void)state;
    assert_string_equal(kent_shown_station(KENT_SI, 640.4).text, "0+640");
    assert_string_equal(kent_shown_station(KENT_SI, 999.6).text, "1+000");
    assert_string_equal(kent_shown_station(KENT_SI, 12034.0).text, "12+034");
    assert_string_equal(kent_shown_station(KENT_SI, -5.0).text, "-0+005");
    assert_string_equal(kent_shown_station(KENT_SI, NAN).text, "–");
    assert_string_equal(kent_shown_station(KENT_US, 1234.5 * 0.3048).text, "12+34.5");
    assert_string_equal(kent_shown_station(KENT_US, 1299.96 * 0.3048).text, "13+00.0");
}

static void azimuths_are_degrees_in_si_and_quadrants_in_us(void **state)
{
    (void)state;
    assert_string_equal(kent_shown_azimuth(KENT_SI, 280.2 * DEGREE, KENT_ROOMY).text,
                        "280°");
    assert_string_equal(kent_shown_azimuth(KENT_SI, 359.7 * DEGREE, KENT_ROOMY).text,
                        "0°");
    static const struct {
        double degrees;
        const char *quadrant;
    } CASES[] = {{0.0, "due N"},     {23.0, "N 23° E"},  {90.0, "due E"},
                 {157.0, "S 23° E"}, {180.0, "due S"},   {203.0, "S 23° W"},
                 {270.0, "due W"},   {337.0, "N 23° W"}, {359.8, "due N"}};
    for (size_t i = 0; i < sizeof CASES / sizeof CASES[0]; i++) {
        const double azimuth = CASES[i].degrees * DEGREE;
        assert_string_equal(kent_shown_azimuth(KENT_US, azimuth, KENT_ROOMY).text,
                            CASES[i].quadrant);
    }
    assert_string_equal(kent_shown_azimuth(KENT_US, 157.0 * DEGREE, KENT_TIGHT).text,
                        "S23°E");
}

static void a_number_that_rounds_to_nil_has_no_sign(void **state)
{
    (void)state;
    assert_string_equal(kent_shown_number(-0.04, 1).text, "0.0");
    assert_string_equal(kent_shown_number(-0.06, 1).text, "-0.1");
    assert_string_equal(kent_shown_number(NAN, 1).text, "–");
    assert_string_equal(kent_shown_number(INFINITY, 1).text, "–");
}

static void a_push_shows_the_parts_that_count(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_fitting f = {.point = kent_build_point(&b, "P", 0.0, 0.0, 0.0)};
    static const struct {
        kent_vec3 thrust; /* N */
        const char *si, *us;
    } CASES[] = {
        {{1e3, 0.0, 0.0}, "90°", "due E"},
        {{0.0, 0.0, 83e3}, "↑ 83.0", "↑ 18.7"},
        {{1e3, 0.0, -83e3}, "↓ 83.0", "↓ 18.7"},
        {{-30e3, -30e3, 20e3}, "225° ↑ 20.0", "S 45° W ↑ 4.5"},
        {{0.0, 0.0, 0.0}, "–", "–"},
        {{NAN, NAN, NAN}, "–", "–"},
    };
    for (size_t i = 0; i < sizeof CASES / sizeof CASES[0]; i++) {
        const kent_vec3 t = CASES[i].thrust;
        assert_string_equal(kent_shown_push(b.model, &f, t, KENT_SI, KENT_ROOMY).text,
                            CASES[i].si);
        assert_string_equal(kent_shown_push(b.model, &f, t, KENT_US, KENT_ROOMY).text,
                            CASES[i].us);
    }
    b.model->points[0].at.x = NAN; /* schematic: no north to speak of */
    const kent_vec3 left = {0.0, 5e3, 0.0};
    assert_string_equal(kent_shown_push(b.model, &f, left, KENT_SI, KENT_ROOMY).text,
                        "outward");
    kent_build_clear(&b);
}

static void a_size_is_the_class_s_where_the_system_is_its_own(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "P", 500.0, 0.0, 0.0);
    kent_build_point(&b, "E", 500.0, 500.0, 0.0);
    const int p = kent_build_pipe(&b, "A", "R P E", 0.6078, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_derive(&b);
    const kent_fitting *f = &b.model->fittings[kent_build_fitting_of(&b, "P")];
    char *class_of = b.model->pipes[p].pipe_class;
    assert_string_equal(kent_shown_size(b.model, f, KENT_SI).text, "608");
    (void)snprintf(class_of, KENT_ID, "DI-EN545-C30-DN600");
    assert_string_equal(kent_shown_size(b.model, f, KENT_SI).text, "600");
    assert_string_equal(kent_shown_size(b.model, f, KENT_US).text, "23.9");
    (void)snprintf(class_of, KENT_ID, "DI-C151-PC200-24in");
    assert_string_equal(kent_shown_size(b.model, f, KENT_SI).text, "608");
    assert_string_equal(kent_shown_size(b.model, f, KENT_US).text, "24");
    assert_string_equal(kent_shown_fitting(b.model, f, KENT_SI, KENT_ROOMY).text,
                        "bend 90.0°");
    kent_build_clear(&b);
}

/* An old pipe with the outside of a ductile iron one takes the same castings. */
static void a_pipe_without_a_class_has_the_size_of_its_like(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "P", 500.0, 0.0, 0.0);
    kent_build_point(&b, "E", 500.0, 500.0, 0.0);
    kent_build_point(&b, "F", 900.0, 500.0, 0.0);
    const int old = kent_build_pipe(&b, "A", "R P E", 0.2065, 1000.0);
    const int like = kent_build_pipe(&b, "B", "E F", 0.2045, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_derive(&b);
    kent_fitting f = b.model->fittings[kent_build_fitting_of(&b, "P")];
    kent_pipe *pipes = b.model->pipes;
    (void)snprintf(pipes[like].pipe_class, KENT_ID, "PVC-C900-DR18-8in");
    pipes[old].outside_diameter = pipes[like].outside_diameter = 9.05 * 0.0254;
    assert_string_equal(kent_shown_size(b.model, &f, KENT_US).text, "8");
    assert_string_equal(kent_shown_size(b.model, &f, KENT_SI).text, "206");
    pipes[old].outside_diameter = 9.3 * 0.0254;
    assert_string_equal(kent_shown_size(b.model, &f, KENT_US).text, "8.13");

    f.type = KENT_TEE;
    f.branch = (kent_branch){.end = KENT_BRANCH_BLANK,
                             .outside_diameter = 9.05 * 0.0254,
                             .inside_diameter = 0.2};
    f.branch_size = 0.2;
    assert_string_equal(kent_shown_fitting(b.model, &f, KENT_US, KENT_ROOMY).text,
                        "tee, branch 8");
    kent_build_clear(&b);
}

/* "crest" and "sag" are two designs: they outlast the word that a crest implies. */
static void a_bend_says_how_it_turns_in_whatever_room(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_fitting f = {.type = KENT_BEND, .angle = 45.0 * DEGREE, .branch_size = NAN};
    f.orientation = KENT_CREST;
    assert_string_equal(kent_shown_fitting(b.model, &f, KENT_SI, KENT_TIGHTEST).text,
                        "bend 45.0° crest");
    assert_string_equal(kent_shown_fitting(b.model, &f, KENT_SI, KENT_BRIEF).text,
                        "45.0° crest");
    f.orientation = KENT_HORIZONTAL;
    assert_string_equal(kent_shown_fitting(b.model, &f, KENT_SI, KENT_BRIEF).text,
                        "bend 45.0°");
    kent_build_clear(&b);
}

static void a_fitting_is_named_by_what_it_serves(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_fitting f = {.type = KENT_TEE, .role = KENT_ROLE_HYDRANT, .branch_size = 0.1};
    assert_string_equal(kent_shown_fitting(b.model, &f, KENT_SI, KENT_TIGHT).text,
                        "hydrant tee × 100");
    f.role = KENT_ROLE_TAPPING;
    assert_string_equal(kent_shown_fitting(b.model, &f, KENT_SI, KENT_ROOMY).text,
                        "tapping tee, branch 100");
    f.type = KENT_GROUP;
    f.member_count = 2;
    assert_string_equal(kent_shown_fitting(b.model, &f, KENT_SI, KENT_ROOMY).text,
                        "group of 2");
    f = (kent_fitting){.type = KENT_DEAD_END, .role = KENT_ROLE_WASHOUT};
    assert_string_equal(kent_shown_fitting(b.model, &f, KENT_SI, KENT_ROOMY).text,
                        "washout end");
    f = (kent_fitting){.type = KENT_CURVE, .angle = 12.0 * DEGREE};
    assert_string_equal(kent_shown_fitting(b.model, &f, KENT_SI, KENT_ROOMY).text,
                        "curve 12.0°");
    kent_build_clear(&b);
}

static void an_assumption_reads_as_a_sentence(void **state)
{
    (void)state;
    kent_text out = {0};
    kent_shown_assumption("roughness of A\t0.1 mm\tcatalogue", &out);
    assert_string_equal(kent_text_of(&out), "roughness of A = 0.1 mm: catalogue");
    kent_text_clear(&out);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_station_rounds_before_it_splits),
        cmocka_unit_test(azimuths_are_degrees_in_si_and_quadrants_in_us),
        cmocka_unit_test(a_number_that_rounds_to_nil_has_no_sign),
        cmocka_unit_test(a_push_shows_the_parts_that_count),
        cmocka_unit_test(a_size_is_the_class_s_where_the_system_is_its_own),
        cmocka_unit_test(a_pipe_without_a_class_has_the_size_of_its_like),
        cmocka_unit_test(a_bend_says_how_it_turns_in_whatever_room),
        cmocka_unit_test(a_fitting_is_named_by_what_it_serves),
        cmocka_unit_test(an_assumption_reads_as_a_sentence),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
