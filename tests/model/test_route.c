/* Chainage and station. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <string.h>

static void chainage_is_the_length_in_space(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "P", 3.0, 4.0, 12.0); /* 13 m */
    kent_build_point(&b, "E", 3.0, 8.0, 15.0); /* 5 m */
    kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_derive(&b);
    assert_within(b.model->chainage[0], 0.0, 0.0);
    assert_close(b.model->chainage[1], 13.0, 1e-14);
    assert_close(b.model->chainage[2], 18.0, 1e-14);
    kent_build_clear(&b);
}

static void a_given_length_is_spread_over_the_legs_and_cautioned(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "P", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 400.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    b.model->pipes[0].length = 403.0; /* 0.75 %: a slip of the tape */
    kent_build_derive(&b);
    assert_int_equal(b.model->cautions.count, 0);
    b.model->pipes[0].length = 440.0; /* 10 % */
    kent_build_derive(&b);
    assert_close(b.model->chainage[1], 110.0, 1e-14);
    assert_close(b.model->chainage[2], 440.0, 1e-15);
    assert_int_equal(b.model->cautions.count, 1);
    assert_non_null(strstr(b.model->cautions.text[0], "10.0 % more"));
    kent_build_clear(&b);
}

static void a_pipe_without_coordinates_takes_its_given_length(void **state)
{
    (void)state;
    const double none = (double)NAN;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", none, none, 10.0);
    kent_build_point(&b, "E", none, none, 0.0);
    kent_build_pipe(&b, "A", "R E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    b.model->pipes[0].length = 600.0;
    kent_build_derive(&b);
    assert_close(b.model->spans[0].length, 600.0, 1e-15);
    assert_close(kent_span_level(b.model, &b.model->spans[0], 150.0), 7.5, 1e-14);
    kent_build_clear(&b);
}

/* A main in two pipes with a branch that starts where the first ends. */
static kent_build main_with_branch(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "T", 500.0, 0.0, 0.0);
    kent_build_point(&b, "E", 800.0, 0.0, 0.0);
    kent_build_point(&b, "D", 500.0, 90.0, 0.0);
    kent_build_pipe(&b, "A", "R T", 0.3, 1000.0);
    kent_build_pipe(&b, "B", "T E", 0.3, 1000.0);
    kent_build_pipe(&b, "C", "T D", 0.1, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

static double station(const kent_build *b, const char *id)
{
    return b->model->fittings[kent_build_fitting_of(b, id)].station;
}

static void stations_go_on_along_the_main_and_start_anew_on_a_branch(void **state)
{
    (void)state;
    kent_build b = main_with_branch();
    kent_build_derive(&b);
    assert_close(station(&b, "T"), 500.0, 1e-14);
    assert_close(station(&b, "E"), 800.0, 1e-14);
    assert_close(station(&b, "D"), 90.0, 1e-14);
    kent_build_clear(&b);
}

static void a_given_station_anchors_the_others(void **state)
{
    (void)state;
    kent_build b = main_with_branch();
    b.model->points[kent_model_point_index(b.model, "T")].station = 1198.0;
    kent_build_derive(&b);
    assert_close(station(&b, "T"), 1198.0, 1e-14);
    assert_close(station(&b, "E"), 1498.0, 1e-14);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(chainage_is_the_length_in_space),
        cmocka_unit_test(a_given_length_is_spread_over_the_legs_and_cautioned),
        cmocka_unit_test(a_pipe_without_coordinates_takes_its_given_length),
        cmocka_unit_test(stations_go_on_along_the_main_and_start_anew_on_a_branch),
        cmocka_unit_test(a_given_station_anchors_the_others),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
