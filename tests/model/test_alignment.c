/* A main laid out from stations and turns. Coordinates by hand. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <string.h>

static const double DEGREE = 3.14159265358979323846 / 180.0;
static const double NONE = (double)NAN;

/* A point without x and y. turn in degrees, + to the left; NAN: none. */
static void add(kent_build *b, const char *id, double station, double turn, double z)
{
    const int p = kent_build_point(b, id, NONE, NONE, z);
    b->model->points[p].station = station;
    b->model->points[p].turn = turn * DEGREE;
}

/* R 0+000, P 0+100 left 90, Q 0+250 right 45, E 0+300; level. */
static kent_build street_main(void)
{
    kent_build b = kent_build_new();
    add(&b, "R", 0.0, NONE, 0.0);
    add(&b, "P", 100.0, 90.0, 0.0);
    add(&b, "Q", 250.0, -45.0, 0.0);
    add(&b, "E", 300.0, NONE, 0.0);
    kent_build_pipe(&b, "A", "R P Q E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

static void assert_at(const kent_build *b, const char *id, double x, double y)
{
    const kent_point *p = &b->model->points[kent_model_point_index(b->model, id)];
    assert_true(p->laid_out);
    assert_within(p->at.x, x, 1e-10);
    assert_within(p->at.y, y, 1e-10);
}

static const kent_fitting *fitting(const kent_build *b, const char *id)
{
    return &b->model->fittings[kent_build_fitting_of(b, id)];
}

static void a_curve_does_not_turn_straight_back(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add(&b, "R", 0.0, NONE, 0.0);
    add(&b, "P", 100.0, 178.0, 0.0);
    add(&b, "E", 300.0, NONE, 0.0);
    b.model->points[1].curve_radius = 2.0;
    kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_refused(&b, "no curve turns straight back", 2);
}

static void stations_and_turns_place_the_points(void **state)
{
    (void)state;
    kent_build b = street_main();
    kent_build_derive(&b);
    assert_at(&b, "R", 0.0, 0.0);
    assert_at(&b, "P", 100.0, 0.0);
    assert_at(&b, "Q", 100.0, 150.0);
    assert_at(&b, "E", 100.0 + 50.0 * sqrt(0.5), 150.0 + 50.0 * sqrt(0.5));
    assert_close(fitting(&b, "P")->angle, 90.0 * DEGREE, 1e-13);
    assert_close(fitting(&b, "P")->plan_turn, 90.0 * DEGREE, 1e-13);
    assert_close(fitting(&b, "Q")->plan_turn, -45.0 * DEGREE, 1e-13);
    assert_close(fitting(&b, "Q")->station, 250.0, 1e-14);
    assert_int_equal(b.model->cautions.count, 0);
    assert_int_equal(b.model->assumed.count, 1);
    kent_build_derive(&b); /* once more: from what was given */
    assert_at(&b, "P", 100.0, 0.0);
    assert_int_equal(b.model->assumed.count, 1);
    kent_build_clear(&b);
}

static void levels_give_the_grade_and_bends_in_profile(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add(&b, "R", 0.0, NONE, 0.0);
    add(&b, "P", 40.0, NONE, 30.0); /* 40 m level, 50 m along the slope */
    add(&b, "E", 140.0, NONE, 30.0);
    kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_derive(&b);
    assert_close(b.model->chainage[1], 50.0, 1e-14);
    assert_close(b.model->chainage[2], 150.0, 1e-14);
    assert_int_equal(fitting(&b, "P")->orientation, KENT_CREST);
    assert_close(fitting(&b, "P")->angle, atan2(30.0, 40.0), 1e-13);
    kent_build_clear(&b);
}

static void a_riser_has_one_station_at_foot_and_head(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    add(&b, "R", 0.0, NONE, 0.0);
    add(&b, "P", 40.0, NONE, 0.0);
    add(&b, "Q", 40.0, NONE, -3.0);
    add(&b, "E", 100.0, NONE, -3.0);
    kent_build_pipe(&b, "A", "R P Q E", 0.3, 1000.0);
    b.model->pipes[0].joint = KENT_PUSH_ON;
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_derive(&b);
    assert_at(&b, "E", 100.0, 0.0);
    assert_close(b.model->chainage[3], 103.0, 1e-14);
    assert_close(fitting(&b, "P")->angle, 90.0 * DEGREE, 1e-13);
    kent_build_clear(&b);
}

static void a_pipe_goes_on_with_the_heading_of_the_one_before(void **state)
{
    (void)state;
    kent_build b = street_main();
    const int end = kent_model_point_index(b.model, "E");
    b.model->points[end].station_ahead = 1000.0; /* a new count */
    b.model->points[end].turn = 45.0 * DEGREE;   /* 45 + 45: along +y */
    add(&b, "F", 1080.0, NONE, 0.0);
    kent_build_pipe(&b, "B", "E F", 0.3, 1000.0);
    kent_build_derive(&b);
    assert_at(&b, "F", 100.0 + 50.0 * sqrt(0.5), 230.0 + 50.0 * sqrt(0.5));
    assert_close(fitting(&b, "E")->plan_turn, 45.0 * DEGREE, 1e-13);
    assert_close(fitting(&b, "E")->station, 300.0, 1e-14);
    assert_close(fitting(&b, "F")->station, 1080.0, 1e-14);
    kent_build_clear(&b);
}

static void a_branch_turns_off_the_pipe_that_runs_there(void **state)
{
    (void)state;
    kent_build b = street_main();
    const int t = kent_build_point(&b, "T", NONE, NONE, 0.0); /* on the second leg */
    b.model->points[t].station = 200.0;
    add(&b, "D", 60.0, NONE, 0.0); /* stations of the branch's own */
    b.model->pipe_count = 0;
    b.model->route_count = 0;
    kent_build_pipe(&b, "C", "T D", 0.1, 1000.0); /* listed first */
    b.model->pipes[0].branch_turn = -90.0 * DEGREE;
    kent_build_pipe(&b, "A", "R P T Q E", 0.3, 1000.0);
    kent_build_derive(&b);
    assert_at(&b, "T", 100.0, 100.0);
    assert_at(&b, "D", 160.0, 100.0); /* heading +y, then right */
    assert_int_equal(fitting(&b, "T")->type, KENT_TEE);
    assert_close(fitting(&b, "T")->station, 200.0, 1e-14);
    assert_close(fitting(&b, "D")->station, 60.0, 1e-14);
    assert_int_equal(b.model->cautions.count, 0);

    b.model->points[kent_model_point_index(b.model, "D")].station = NONE;
    b.model->pipes[0].length = 80.0; /* without stations, its length will do */
    kent_build_derive(&b);
    assert_at(&b, "D", 180.0, 100.0);
    b.model->pipes[0].branch_turn = NONE;
    b.model->pipes[0].length = NONE;
    b.model->points[kent_model_point_index(b.model, "D")].station = 60.0;
    kent_build_refused(&b, "branch_turn = \"90 deg left\"", 100);
}

static void a_branch_of_unknown_turn_is_said_or_refused(void **state)
{
    (void)state;
    kent_build b = street_main();
    kent_build_point(&b, "D", NONE, NONE, 0.0);
    const int pipe = kent_build_pipe(&b, "C", "P D", 0.1, 1000.0);
    b.model->pipes[pipe].length = 40.0;     /* as a schematic branch would be */
    b.model->pipes[pipe].branch_turn = 0.0; /* straight on, the main turns left */
    kent_build_derive(&b);
    assert_at(&b, "D", 140.0, 0.0);
    assert_int_equal(fitting(&b, "P")->type, KENT_TEE);
    b.model->points[1].turn = NONE; /* nothing turns at P: the run is known */
    b.model->pipes[pipe].branch_turn = NONE;
    kent_build_derive(&b);
    assert_int_equal(b.model->cautions.count, 1);
    assert_non_null(strstr(b.model->cautions.text[0], "its branch_turn"));
    b.model->points[1].turn = 90.0 * DEGREE; /* the tee's run would be lost */
    kent_build_refused(&b, "branch_turn = \"90 deg left\"", 101);
}

/* A ring: along +x to T, left to P, left to Q, and back down on to R's leg at S. */
static kent_build ring(double last_turn)
{
    kent_build b = kent_build_new();
    add(&b, "R", 0.0, NONE, 0.0);
    add(&b, "S", 100.0, NONE, 0.0);
    add(&b, "T", 300.0, 90.0, 0.0);
    add(&b, "P", 400.0, 90.0, 0.0);
    add(&b, "Q", 600.0, NONE, 0.0);
    kent_build_pipe(&b, "A", "R S T P Q", 0.3, 1000.0);
    kent_build_pipe(&b, "B", "Q S", 0.3, 1000.0);
    b.model->points[4].turn = last_turn * DEGREE;
    kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

static void a_ring_must_close(void **state)
{
    (void)state;
    kent_build b = ring(90.0); /* Q (100, 100) down to S (100, 0) */
    b.model->pipes[1].length = 100.5;
    kent_build_derive(&b);
    assert_int_equal(b.model->cautions.count, 0);
    assert_at(&b, "S", 100.0, 0.0);
    b.model->pipes[1].length = 104.0;
    kent_build_derive(&b);                        /* 4 m beyond S */
    assert_int_equal(b.model->cautions.count, 2); /* and 4 % longer than x and y */
    assert_non_null(strstr(b.model->cautions.text[0], "misses \"S\" by 4.00 m"));
    kent_build_clear(&b);

    kent_build askew = ring(80.0); /* by stations alone: 10 degrees off */
    kent_build_derive(&askew);
    assert_int_equal(askew.model->cautions.count, 1);
    assert_non_null(strstr(askew.model->cautions.text[0], "misses \"S\" by 17.36 m"));
    kent_build_clear(&askew);
}

static void mains_laid_out_apart_are_said_to_share_their_start(void **state)
{
    (void)state;
    for (int mains = 1; mains <= 2; mains++) {
        kent_build b = kent_build_new();
        add(&b, "A", 0.0, NAN, 10.0);
        add(&b, "B", 100.0, 0.5, 10.0);
        add(&b, "C", 200.0, NAN, 10.0);
        kent_build_pipe(&b, "P", "A B C", 0.3, 1000.0);
        kent_build_fixed_level(&b, "A", 50.0);
        if (mains == 2) {
            add(&b, "F", 0.0, NAN, 10.0);
            add(&b, "G", 100.0, 0.5, 10.0);
            add(&b, "H", 200.0, NAN, 10.0);
            kent_build_pipe(&b, "Q", "F G H", 0.3, 1000.0);
            kent_build_fixed_level(&b, "F", 50.0);
        }
        kent_build_derive(&b);
        assert_int_equal(b.model->cautions.count, mains - 1);
        if (mains == 2) {
            assert_non_null(strstr(b.model->cautions.text[0], "2 mains are laid out"));
        }
        kent_build_clear(&b);
    }
}

static void what_cannot_be_laid_out_is_refused(void **state)
{
    (void)state;
    kent_build falling = street_main();
    falling.model->points[2].station = 90.0;
    kent_build_refused(&falling, "its station is 90.00 m, that of \"P\" before it", 3);

    kent_build gap = street_main();
    gap.model->points[2].station = NONE;
    gap.model->points[1].turn = gap.model->points[2].turn = NONE;
    kent_build_refused(&gap, "a station at each", 100);

    kent_build mixed = street_main();
    mixed.model->points[1].at.x = 100.0;
    mixed.model->points[1].at.y = 0.0;
    mixed.model->points[1].turn = mixed.model->points[2].turn = NONE;
    kent_build_refused(&mixed, "give all x and y, or none", 100);

    kent_build end = street_main();
    end.model->points[3].turn = 0.3;
    kent_build_refused(&end, "its turn says nothing", 4);

    kent_build start = street_main();
    start.model->points[0].station = NONE;
    kent_build_refused(&start, "how far \"P\" is from \"R\"", 2);

    kent_build two = street_main(); /* another main that only ends on this one */
    add(&two, "X", 0.0, NONE, 0.0);
    add(&two, "Y", 50.0, NONE, 0.0);
    kent_build_pipe(&two, "B", "X Y P", 0.3, 1000.0);
    kent_build_refused(&two, "which other stations and turns place already", 101);

    kent_build across = street_main();
    add(&across, "X", 80.0, NONE, 0.0);
    const int pipe = kent_build_pipe(&across, "B", "P Q X", 0.3, 1000.0);
    across.model->pipes[pipe].branch_turn = 0.5;
    kent_build_refused(&across, "pipe \"B\" comes to \"Q\"", 101);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_curve_does_not_turn_straight_back),
        cmocka_unit_test(stations_and_turns_place_the_points),
        cmocka_unit_test(levels_give_the_grade_and_bends_in_profile),
        cmocka_unit_test(a_riser_has_one_station_at_foot_and_head),
        cmocka_unit_test(a_pipe_goes_on_with_the_heading_of_the_one_before),
        cmocka_unit_test(a_branch_turns_off_the_pipe_that_runs_there),
        cmocka_unit_test(a_branch_of_unknown_turn_is_said_or_refused),
        cmocka_unit_test(a_ring_must_close),
        cmocka_unit_test(mains_laid_out_apart_are_said_to_share_their_start),
        cmocka_unit_test(what_cannot_be_laid_out_is_refused),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
