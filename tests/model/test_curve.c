/* Curves by radius, and turns of joints one after another. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <string.h>

static const double DEGREE = 3.14159265358979323846 / 180.0;
static const double FOOT = 0.3048;
static const double NONE = (double)NAN;

static const kent_fitting *fitting(const kent_build *b, const char *id)
{
    return &b->model->fittings[kent_build_fitting_of(b, id)];
}

static const kent_port *port(const kent_build *b, const char *id, size_t i)
{
    return &b->model->ports[fitting(b, id)->port_first + i];
}

/* R - P - E with 300 m legs that turn by `degrees` at P on a radius. */
static kent_build curve(double degrees, double radius)
{
    kent_build b = kent_build_new();
    const double turn = degrees * DEGREE;
    kent_build_point(&b, "R", -300.0, 0.0, 0.0);
    kent_build_point(&b, "P", 0.0, 0.0, 0.0);
    kent_build_point(&b, "E", 300.0 * cos(turn), 300.0 * sin(turn), 0.0);
    kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    b.model->points[1].curve_radius = radius;
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_fixed_level(&b, "E", 40.0);
    return b;
}

static void a_curve_is_followed_along_its_arc(void **state)
{
    (void)state;
    const double radius = 120.0, turn = 60.0 * DEGREE;
    const double tangent = radius * tan(0.5 * turn), arc = radius * turn;
    kent_build b = curve(60.0, radius);
    kent_build_derive(&b);
    const kent_fitting *f = fitting(&b, "P");
    assert_int_equal(f->type, KENT_CURVE);
    assert_close(f->angle, turn, 1e-13);
    assert_close(f->plan_turn, turn, 1e-13);
    assert_close(f->curve_radius, radius, 1e-15);
    assert_close(f->curve_length, arc, 1e-13);
    assert_int_equal(f->restraint, KENT_NO_RESTRAINT);
    assert_int_equal(f->port_count, 2);
    assert_close(b.model->chainage[1], 300.0 - tangent + 0.5 * arc, 1e-13);
    assert_close(b.model->chainage[2], 600.0 - 2.0 * tangent + arc, 1e-13);
    assert_close(port(&b, "P", 1)->direction.x, 0.5, 1e-13); /* along the tangent */
    assert_int_equal(b.model->cautions.count, 0);
    kent_build_clear(&b);
}

/* A worked example of route surveying: C. D. Ghilani and P. R. Wolf, "Elementary
 * Surveying", ch. 24, example 24.1 (from memory): I = 8 deg 24', D = 2 deg 00' by the
 * arc, so R = 2864.79 ft, T = 210.38 ft, L = 420.00 ft; PI at 64 + 27.46, PC 62
 * + 17.08, PT 66 + 37.08. From PT a point 500 ft further on is at 71 + 37.08, and
 * 710.38 ft from PI. */
static void stations_count_along_the_arc_as_surveyors_do(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", NONE, NONE, 0.0);
    kent_build_point(&b, "PI", NONE, NONE, 0.0);
    kent_build_point(&b, "E", NONE, NONE, 0.0);
    kent_build_pipe(&b, "A", "R PI E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_point *points = b.model->points;
    points[0].station = 6000.0 * FOOT;
    points[1].station = 6427.46 * FOOT;
    points[1].turn = (8.0 + 24.0 / 60.0) * DEGREE;
    points[1].curve_radius = 2864.79 * FOOT;
    points[2].station = 7137.08 * FOOT;
    kent_build_derive(&b);
    const kent_vec3 leg = kent_vec3_sub(points[2].at, points[1].at);
    /* 710.38 is made of two figures rounded to 0.01 ft */
    assert_within(kent_vec3_length(leg), 710.38 * FOOT, 0.01 * FOOT);
    assert_within(fitting(&b, "PI")->curve_length, 420.00 * FOOT, 0.005 * FOOT);
    /* Level, the main is as long as its stations say. */
    assert_close(b.model->chainage[2], 1137.08 * FOOT, 1e-13);
    kent_build_clear(&b);
}

static void what_a_curve_asks_of_joints_is_held_against_them(void **state)
{
    (void)state;
    kent_build b = curve(60.0, 120.0);
    b.model->pipes[0].laying_length = 6.0;
    b.model->pipes[0].joint_deflection = 3.0 * DEGREE; /* 6 m / 120 m = 2.86 degrees */
    kent_build_derive(&b);
    assert_int_equal(b.model->cautions.count, 0);
    b.model->pipes[0].joint_deflection = 2.5 * DEGREE; /* 6 m / 2.5 degrees = 137.5 m */
    kent_build_derive(&b);
    assert_int_equal(b.model->cautions.count, 1);
    assert_non_null(strstr(b.model->cautions.text[0], "at least 137.51 m"));
    kent_build_clear(&b);
}

static void a_curve_that_cannot_be_is_refused(void **state)
{
    (void)state;
    kent_build wide = curve(60.0, 600.0); /* tangent 346 m on a leg of 300 m */
    kent_build_refused(&wide,
                       "there are 300.00 m, and the tangents of the curves there "
                       "take 346.41 m",
                       2);

    kent_build straight = curve(0.2, 600.0);
    kent_build_refused(&straight, "the route runs straight on", 2);

    kent_build end = curve(60.0, 100.0);
    end.model->points[2].curve_radius = 50.0;
    kent_build_refused(&end, "a curve lies in the course of one pipe", 3);

    kent_build met = curve(60.0, 100.0);
    kent_build_point(&met, "D", 0.0, -50.0, 0.0);
    kent_build_pipe(&met, "C", "P D", 0.1, 1000.0);
    kent_build_refused(&met, "a curve lies in the course of one pipe", 2);

    kent_build valve = curve(60.0, 100.0);
    kent_build_valve(&valve, "V1", "P", 0.1, NONE);
    kent_build_refused(&valve, "no place for a curve", 2);

    kent_build bend = curve(60.0, 100.0);
    const int note = kent_build_note(&bend, "P");
    bend.model->notes[note].type = KENT_BEND;
    kent_build_refused(&bend, "the pipe follows a curve there", 800);
}

/* Six joints 6 m apart that turn by 2 degrees each, left or right by sign. */
static kent_build joints(const double sign[6])
{
    kent_build b = kent_build_new();
    double x = 0.0, y = 0.0, heading = 0.0;
    kent_build_point(&b, "R", -100.0, 0.0, 0.0);
    for (int i = 0; i < 6; i++) {
        const char name[] = {(char)('1' + i), '\0'};
        kent_build_point(&b, name, x, y, 0.0);
        heading += 2.0 * sign[i] * DEGREE;
        const double leg = i < 5 ? 6.0 : 100.0;
        x += leg * cos(heading);
        y += leg * sin(heading);
    }
    kent_build_point(&b, "E", x, y, 0.0);
    const int pipe = kent_build_pipe(&b, "A", "R 1 2 3 4 5 6 E", 0.3, 1000.0);
    b.model->pipes[pipe].joint_deflection = 3.0 * DEGREE;
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_fixed_level(&b, "E", 40.0);
    return b;
}

static void turns_of_joints_one_after_another_are_one_curve(void **state)
{
    (void)state;
    kent_build b = joints((double[]){1.0, 1.0, 1.0, 1.0, 1.0, 1.0});
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 1);
    const kent_fitting *f = fitting(&b, "1");
    assert_int_equal(f->type, KENT_CURVE);
    assert_int_equal(f->member_count, 6);
    assert_close(f->angle, 12.0 * DEGREE, 1e-11);
    assert_close(f->plan_turn, 12.0 * DEGREE, 1e-11);
    assert_close(f->curve_length, 36.0, 1e-11);
    assert_close(f->curve_radius, 36.0 / (12.0 * DEGREE), 1e-11); /* 6 m / 2 degrees */
    assert_int_equal(f->restraint, KENT_NO_RESTRAINT);
    assert_int_equal(port(&b, "1", 0)->toward, kent_model_point_index(b.model, "R"));
    assert_int_equal(port(&b, "1", 1)->toward, kent_model_point_index(b.model, "E"));
    assert_int_equal(kent_model_fitting_of(b.model, "4"), 0);
    kent_build_clear(&b);
}

static void turns_the_other_way_or_further_on_are_another_curve(void **state)
{
    (void)state;
    kent_build b = joints((double[]){1.0, 1.0, 1.0, -1.0, -1.0, -1.0});
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 2);
    assert_int_equal(fitting(&b, "1")->member_count, 3);
    assert_int_equal(fitting(&b, "4")->member_count, 3);
    assert_close(fitting(&b, "4")->plan_turn, -6.0 * DEGREE, 1e-11);
    b.model->pipes[0].laying_length = 2.9; /* two pipes: 5.8 m */
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 6);
    assert_true(fitting(&b, "3")->within_deflection);
    b.model->pipes[0].laying_length = 3.1;
    kent_build_derive(&b);
    assert_int_equal(b.model->fitting_count, 2);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_curve_is_followed_along_its_arc),
        cmocka_unit_test(stations_count_along_the_arc_as_surveyors_do),
        cmocka_unit_test(what_a_curve_asks_of_joints_is_held_against_them),
        cmocka_unit_test(a_curve_that_cannot_be_is_refused),
        cmocka_unit_test(turns_of_joints_one_after_another_are_one_curve),
        cmocka_unit_test(turns_the_other_way_or_further_on_are_another_curve),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
