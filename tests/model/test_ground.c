/* Ground along a pipe: zones by station, cover from levels. Figures by hand. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <string.h>

enum { ZONES = 3 };

/* R - P - E, 400 m and 600 m along x, 0.6 m bore and 0.62 m outside; soil "sand" under
 * 1.2 m, "clay" not yet used. */
static kent_build main_of_1000_m(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "P", 400.0, 0.0, 10.0);
    kent_build_point(&b, "E", 1000.0, 0.0, 10.0);
    kent_build_pipe(&b, "A", "R P E", 0.6, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_soil(&b, "clay", 50e3, 19e3, 1.5);
    kent_build_soil(&b, "sand", 80e3, 18e3, 1.2);
    return b;
}

/* A zone that says nothing yet. */
static kent_ground_zone *zoned(kent_build *b, int pipe, double from, double to)
{
    kent_model *m = b->model;
    if (!m->ground_zones) {
        m->ground_zones = kent_alloc(ZONES, sizeof *m->ground_zones);
        assert_non_null(m->ground_zones);
    }
    assert_true(m->ground_zone_count < ZONES);
    kent_ground_zone *zone = &m->ground_zones[m->ground_zone_count];
    *zone = (kent_ground_zone){.pipe = pipe,
                               .from = from,
                               .to = to,
                               .soil = -1,
                               .cover = (double)NAN,
                               .water_table = (double)NAN,
                               .trench = -1,
                               .backfill = -1,
                               .place = {0, 900 + (int)m->ground_zone_count++}};
    return zone;
}

static const kent_fitting *fitting(const kent_build *b, const char *id)
{
    return &b->model->fittings[kent_build_fitting_of(b, id)];
}

static void a_zone_says_what_lies_between_its_stations(void **state)
{
    (void)state;
    kent_build b = main_of_1000_m();
    kent_ground_zone *zone = zoned(&b, 0, 300.0, 500.0);
    zone->soil = 0;
    zone->water_table = 0.9;
    zone->trench = 2;
    kent_build_derive(&b);
    const kent_ground_here before = kent_model_ground_at(b.model, 0, 299.9);
    assert_int_equal(before.soil, 1);
    assert_int_equal(before.zone, -1);
    assert_int_equal(before.trench, -1);
    assert_true(isinf(before.water_table));
    const kent_ground_here within = kent_model_ground_at(b.model, 0, 300.0);
    assert_int_equal(within.soil, 0);
    assert_int_equal(within.zone, 0);
    assert_int_equal(within.trench, 2);
    assert_close(within.water_table, 0.9, 1e-15);
    assert_close(within.cover, 1.2, 1e-15); /* the zone leaves it to ground */
    assert_int_equal(kent_model_ground_at(b.model, 0, 499.9).soil, 0);
    assert_int_equal(kent_model_ground_at(b.model, 0, 500.0).soil, 1);
    kent_build_clear(&b);
}

static void zones_follow_stations_not_lengths(void **state)
{
    (void)state;
    kent_build b = main_of_1000_m();
    b.model->points[0].station = 2000.0;
    b.model->points[1].station = 2400.0;
    b.model->points[1].station_ahead = 5000.0; /* counting goes on from here */
    zoned(&b, 0, 5150.0, 5600.0)->soil = 0;
    kent_build_derive(&b);
    assert_close(kent_model_station_at(b.model, 0, 100.0), 2100.0, 1e-14);
    assert_close(kent_model_station_at(b.model, 0, 550.0), 5150.0, 1e-14);
    assert_close(fitting(&b, "E")->station, 5600.0, 1e-14);
    assert_int_equal(kent_model_ground_at(b.model, 0, 549.0).soil, 1);
    assert_int_equal(kent_model_ground_at(b.model, 0, 551.0).soil, 0);
    assert_int_equal(fitting(&b, "E")->soil, 0); /* a zone takes in its pipe's end */
    kent_build_clear(&b);
}

static void a_fitting_takes_note_then_point_then_zone_then_ground(void **state)
{
    (void)state;
    kent_build b = main_of_1000_m();
    b.model->points[1].at.y = 200.0; /* P: a bend */
    kent_ground_zone *zone = zoned(&b, 0, 100.0, 900.0);
    b.model->ground.trench = 4;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "P")->zone, 0);
    assert_int_equal(fitting(&b, "P")->trench, 4);
    assert_int_equal(fitting(&b, "P")->soil, 1);
    assert_close(fitting(&b, "P")->cover, 1.2, 1e-15);
    assert_int_equal(fitting(&b, "E")->zone, -1);

    zone->soil = 0;
    zone->cover = 2.0;
    zone->water_table = 1.1;
    zone->trench = 3;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "P")->soil, 0);
    assert_int_equal(fitting(&b, "P")->trench, 3);
    assert_close(fitting(&b, "P")->cover, 2.0, 1e-15);
    assert_close(fitting(&b, "P")->water_table, 1.1, 1e-15);

    b.model->points[1].soil = 1;
    b.model->points[1].cover = 1.7;
    b.model->points[1].water_table = 0.4;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "P")->soil, 1);
    assert_close(fitting(&b, "P")->cover, 1.7, 1e-15);
    assert_close(fitting(&b, "P")->water_table, 0.4, 1e-15);

    const int note = kent_build_note(&b, "P");
    b.model->notes[note].soil = 0;
    b.model->notes[note].cover = 2.6;
    kent_build_derive(&b);
    assert_int_equal(fitting(&b, "P")->soil, 0);
    assert_close(fitting(&b, "P")->cover, 2.6, 1e-15);
    kent_build_clear(&b);
}

static void a_level_of_the_ground_gives_the_cover(void **state)
{
    (void)state;
    kent_build b = main_of_1000_m();
    b.model->points[1].at.y = 200.0;
    b.model->points[1].ground_level = 11.81; /* z 10, half of 0.62 m: 1.50 m */
    b.model->points[2].ground_level = 12.81;
    kent_build_derive(&b);
    assert_close(fitting(&b, "P")->cover, 1.5, 1e-13);
    const double *chainage = b.model->chainage;
    const double quarter = chainage[1] + 0.25 * (chainage[2] - chainage[1]);
    assert_close(kent_model_ground_at(b.model, 0, quarter).cover, 1.75, 1e-13);
    assert_close(kent_model_ground_at(b.model, 0, 10.0).cover, 1.2, 1e-15);
    kent_build_clear(&b);
}

static void two_pipes_keep_their_zones_apart(void **state)
{
    (void)state;
    kent_build b = main_of_1000_m();
    kent_build_point(&b, "F", 1000.0, 300.0, 10.0);
    const int second = kent_build_pipe(&b, "B", "E F", 0.6, 1000.0); /* 1000 .. 1300 */
    zoned(&b, second, 1000.0, 1200.0)->soil = 0;
    zoned(&b, 0, 900.0, 950.0)->soil = 0;
    kent_build_derive(&b);
    assert_int_equal(kent_model_ground_at(b.model, 0, 920.0).zone, 1);
    assert_int_equal(kent_model_ground_at(b.model, 0, 960.0).zone, -1);
    assert_int_equal(kent_model_ground_at(b.model, second, 0.0).zone, 0);
    assert_int_equal(kent_model_ground_at(b.model, second, 210.0).zone, -1);
    assert_int_equal(fitting(&b, "E")->zone, 0); /* in none of A's, but in B's */
    kent_build_clear(&b);
}

static void what_cannot_be_is_refused(void **state)
{
    (void)state;
    kent_build beyond = main_of_1000_m();
    zoned(&beyond, 0, 900.0, 1100.0)->soil = 0;
    kent_build_refused(&beyond, "from 0+900 to 1+100, the pipe from 0+000 to 1+000",
                       900);

    kent_build bare = main_of_1000_m();
    bare.model->points[2].ground_level = 10.2;
    kent_build_refused(&bare, "ground_level is 0.11 m below the crown", 3);

    kent_build falling = main_of_1000_m();
    falling.model->points[1].station = 700.0;
    falling.model->points[2].station = 650.0;
    kent_build_refused(&falling, "its station is 650.00 m, that of \"P\" before it", 3);
}

static void a_branch_listed_first_leaves_the_main_its_stations(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "T", 500.0, 0.0, 0.0);
    kent_build_point(&b, "E", 800.0, 0.0, 0.0);
    kent_build_point(&b, "D", 500.0, 90.0, 0.0);
    kent_build_pipe(&b, "C", "T D", 0.1, 1000.0);
    kent_build_pipe(&b, "A", "R T E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    b.model->points[1].station = 1198.0;
    kent_build_derive(&b);
    assert_close(fitting(&b, "T")->station, 1198.0, 1e-14);
    assert_close(fitting(&b, "E")->station, 1498.0, 1e-14);
    assert_close(fitting(&b, "D")->station, 90.0, 1e-14);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_zone_says_what_lies_between_its_stations),
        cmocka_unit_test(zones_follow_stations_not_lengths),
        cmocka_unit_test(a_fitting_takes_note_then_point_then_zone_then_ground),
        cmocka_unit_test(a_level_of_the_ground_gives_the_cover),
        cmocka_unit_test(two_pipes_keep_their_zones_apart),
        cmocka_unit_test(what_cannot_be_is_refused),
        cmocka_unit_test(a_branch_listed_first_leaves_the_main_its_stations),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
