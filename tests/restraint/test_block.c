/* One fitting, one block: every kind of block worked out from a model. */
#include "kent_hand.h"

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6}};

/* A main of two legs, 200 m each, that turns at B: left in plan by plan, and by rise
 * (m per leg) from a climb into a fall. Soil 150 kPa, cover 1.5 m. */
static kent_build main_that_turns(double plan, double rise)
{
    kent_build b = kent_build_new();
    const double x = 200.0 * cos(plan), y = 200.0 * sin(plan);

    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0 - rise);
    (void)kent_build_point(&b, "B", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", x, y, 50.0 - rise);
    (void)kent_build_pipe(&b, "P", "A B C", 0.6, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "C", 0.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    b.model->ground.water_table = (double)INFINITY;
    return b;
}

static kent_restraints *sized(kent_build *b)
{
    kent_build_derive(b);
    return kent_hand_size(b, TEST, 1);
}

static const kent_holding *holding_of(const kent_build *b, const kent_restraints *r,
                                      const char *id)
{
    return &r->fittings[kent_build_fitting_of(b, id)];
}

static double volume_at_b(kent_build *b)
{
    kent_restraints *r = sized(b);
    const kent_holding *h = holding_of(b, r, "B");
    assert_true(h->held);
    const double volume = h->block.volume + h->block.face_volume;
    kent_restraints_free(r);
    kent_build_clear(b);
    return volume;
}

/* By hand: T = 2 p A sin(11.25 deg) = 117.80 kN; 176.7 kN on 150 kPa is 1.178 m2; axis
 * 1.81 m, height up to 1.2067 m: 1.25 x 0.95 m2 is the least in steps of 5 cm (1.20 x
 * 1.00 is 1.2000, 1.10 x 1.10 is 1.2100); (1.25 - 0.62)/2 = 0.315 m is 0.35 m thick. */
static void a_plan_bend_gets_the_face_worked_out_by_hand(void **state)
{
    (void)state;
    kent_build b = main_that_turns(22.5 * DEGREE, 0.0);
    kent_restraints *r = sized(&b);
    const kent_holding *h = holding_of(&b, r, "B");
    const double area = 0.25 * PI * 0.62 * 0.62;
    const double thrust = 2.0 * 1.0e6 * area * sin(11.25 * DEGREE);

    assert_true(h->held);
    assert_int_equal(h->sense, KENT_SIDEWAYS);
    assert_int_equal(h->block.type, KENT_BLOCK_BEARING);
    assert_close(h->design_thrust, 1.5 * thrust, 1e-12);
    assert_close(h->block.bearing_area, 1.5 * thrust / 150e3, 1e-12);
    assert_close(h->block.bearing_area, 1.178, 1e-3);
    assert_close(h->block.height, 0.95, 1e-12);
    assert_close(h->block.width, 1.25, 1e-12);
    assert_close(h->block.thickness, 0.35, 1e-12);
    assert_close(h->block.volume, 1.25 * 0.95 * 0.35, 1e-12);
    assert_close(h->block.bearing_pressure, 1.5 * thrust / 1.1875, 1e-12);
    assert_close(h->utilisation, h->block.bearing_area / 1.1875, 1e-12);
    assert_close(h->factor_reached * h->utilisation, 1.5, 1e-12);
    assert_false(h->block.has_face);
    assert_close(r->concrete, h->block.volume, 1e-12);
    assert_int_equal(r->not_held, 0);
    kent_restraints_free(r);
    kent_build_clear(&b);
}

static void a_factor_inside_the_soil_value_multiplies_the_one_applied(void **state)
{
    (void)state;
    kent_build b = main_that_turns(22.5 * DEGREE, 0.0);
    b.model->soils[0].factor_inside = 2.0;
    kent_restraints *r = sized(&b);
    const kent_holding *h = holding_of(&b, r, "B");
    const kent_line *asked = kent_derivation_find(&h->derivation, "SFa");
    const kent_line *reached = kent_derivation_find(&h->derivation, "SFt");

    assert_non_null(asked);
    assert_close(asked->value, 3.0, 1e-12);
    assert_close(reached->value, 2.0 * h->factor_reached, 1e-12);
    assert_close(h->block.bearing_area, h->design_thrust / 150e3,
                 1e-12); /* as before */
    kent_restraints_free(r);
    kent_build_clear(&b);
}

static void weaker_soil_never_gets_a_smaller_face(void **state)
{
    (void)state;
    double last = 0.0;

    for (int q = 300; q >= 100; q -= 10) {
        kent_build b = main_that_turns(22.5 * DEGREE, 0.0);
        b.model->soils[0].allowable_bearing = 1e3 * q;
        kent_restraints *r = sized(&b);
        const kent_holding *h = holding_of(&b, r, "B");
        assert_true(h->held);
        assert_true(h->block.width * h->block.height >= last - 1e-12);
        last = h->block.width * h->block.height;
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
}

/* One leg climbs and the other falls at the same slope: the sum is straight up, 2 p A
 * sin(half the turn). */
static void a_crest_gets_a_weight_that_beats_the_lift(void **state)
{
    (void)state;
    const double rise = 200.0 * tan(5.625 * DEGREE);
    kent_build b = main_that_turns(0.0, rise);
    kent_restraints *r = sized(&b);
    const kent_holding *h = holding_of(&b, r, "B");
    const double up = 2.0 * 1.0e6 * 0.25 * PI * 0.62 * 0.62 * sin(5.625 * DEGREE);

    assert_true(h->held);
    assert_int_equal(h->sense, KENT_UPWARD);
    assert_int_equal(h->block.type, KENT_BLOCK_GRAVITY);
    assert_close(h->design_thrust, 1.5 * up, 1e-9);
    assert_true(h->block.volume * 23e3 >= 1.5 * up);
    assert_close(h->utilisation, 1.5 * up / (h->block.volume * 23e3), 1e-12);
    assert_false(h->block.has_face);
    assert_false(h->block.submerged);
    assert_close(h->block.width, h->block.thickness, 1e-12);
    assert_true(h->block.height <= h->block.width);
    kent_hand_expect(h, "straps or rods");
    kent_restraints_free(r);
    kent_build_clear(&b);
}

static void a_crest_in_ground_water_takes_more_concrete(void **state)
{
    (void)state;
    const double rise = 200.0 * tan(5.625 * DEGREE);
    kent_build dry = main_that_turns(0.0, rise), wet = main_that_turns(0.0, rise);
    kent_build deep = main_that_turns(0.0, rise);

    wet.model->ground.water_table = 1.0;
    deep.model->ground.water_table = 9.0; /* below any base */
    const double without = volume_at_b(&dry);
    assert_close(volume_at_b(&deep), without, 1e-12);
    /* sides come in steps, so the volumes are near the ratio of the weights, not on it
     */
    assert_close(volume_at_b(&wet) / without, 23.0 / (23.0 - 9.80665), 0.05);
}

static void a_sag_gets_a_base_on_the_ground_below(void **state)
{
    (void)state;
    kent_build b = main_that_turns(0.0, -200.0 * tan(5.625 * DEGREE));
    b.model->soils[0].vertical_bearing = 100e3;
    kent_restraints *r = sized(&b);
    const kent_holding *h = holding_of(&b, r, "B");
    const double down = 2.0 * 1.0e6 * 0.25 * PI * 0.62 * 0.62 * sin(5.625 * DEGREE);

    assert_true(h->held);
    assert_int_equal(h->sense, KENT_DOWNWARD);
    assert_int_equal(h->block.type, KENT_BLOCK_BASE);
    assert_close(h->block.bearing_area, 1.5 * down / 100e3, 1e-9);
    assert_true(h->block.width * h->block.height >=
                h->block.bearing_area * (1.0 - 1e-5));
    assert_true(h->block.bearing_pressure <= 100e3 * (1.0 + 1e-5));
    assert_close(h->block.bearing_pressure, 100e3 * h->utilisation, 1e-12);
    kent_restraints_free(r);
    kent_build_clear(&b);
}

/* Pressed by the test and lifted almost as much by suction: a base on so little ground
 * would have to be a pillar to weigh enough. */
static void a_sag_that_suction_lifts_hard_gets_a_weight_not_a_pillar(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {
        {"test", KENT_CASE_TEST, 1.5, 0.5e6},
        {"shut", KENT_CASE_OCCASIONAL, 1.5, -0.45e6}};
    kent_build b = main_that_turns(0.0, -200.0 * tan(5.625 * DEGREE));
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, cases, 2);
    const kent_holding *h = holding_of(&b, r, "B");
    const double down = 2.0 * 0.5e6 * 0.25 * PI * 0.62 * 0.62 * sin(5.625 * DEGREE);

    assert_true(h->held);
    assert_int_equal(h->block.type, KENT_BLOCK_GRAVITY);
    assert_true(h->block.height <= h->block.width);
    assert_true(h->block.volume * 23e3 >= 1.5 * 0.9 * down * (1.0 - 1e-6));
    assert_true(h->block.width * h->block.thickness * 150e3 >=
                1.5 * down * (1.0 - 1e-6));
    kent_restraints_free(r);
    kent_build_clear(&b);
}

static void a_turn_in_plan_and_profile_gets_a_weight_and_a_face(void **state)
{
    (void)state;
    kent_build b = main_that_turns(20.0 * DEGREE, 200.0 * tan(5.0 * DEGREE));
    kent_restraints *r = sized(&b);
    const kent_holding *h = holding_of(&b, r, "B");

    assert_true(h->held);
    assert_int_equal(h->block.type, KENT_BLOCK_GRAVITY);
    assert_true(h->block.has_face);
    assert_true(h->block.face_utilisation <= 1.0 + 1e-5);
    assert_close(h->utilisation, fmax(h->block.utilisation, h->block.face_utilisation),
                 1e-12);
    assert_close(r->concrete, h->block.volume + h->block.face_volume, 1e-12);
    assert_close(h->block.face_volume,
                 h->block.face.width * h->block.face.height * h->block.face_thickness,
                 1e-12);
    kent_restraints_free(r);
    kent_build_clear(&b);
}

/* A slight climb into the bend lifts it by less than the block behind the face weighs,
 * a slight fall presses on it: no second block is made. */
static void a_little_lift_is_left_to_the_weight_of_the_bearing_block(void **state)
{
    (void)state;
    for (int way = -1; way <= 1; way += 2) {
        kent_build b = main_that_turns(22.5 * DEGREE, way * 1.2);
        kent_restraints *r = sized(&b);
        const kent_holding *h = holding_of(&b, r, "B");
        const kent_sense sense = way > 0 ? KENT_UPWARD : KENT_DOWNWARD;
        const double vertical = 1.5 * 2.0 * 1.0e6 * 0.25 * PI * 0.62 * 0.62 * 1.2 /
                                hypot(200.0, 1.2); /* each leg slopes by 1.2 in 200 */

        assert_true(h->held);
        assert_int_equal(h->by_sense[sense], 0);
        assert_true(vertical > 0.02 * h->design_thrust);
        assert_int_equal(h->block.type, KENT_BLOCK_BEARING);
        assert_false(h->block.has_face);
        assert_true(vertical <= h->block.volume * 23e3);
        assert_true(kent_hand_says(h, "straps or rods") == (way > 0));
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
}

/* A main of 600 that goes on as 400: 1 MPa on 0.62 m less 0.42 m is 163.4 kN. */
static kent_build main_that_narrows(void)
{
    kent_build b = kent_build_new();

    (void)kent_build_point(&b, "A", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "B", 200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 400.0, 0.0, 50.0);
    (void)kent_build_pipe(&b, "P", "A B", 0.6, 1000.0);
    (void)kent_build_pipe(&b, "Q", "B C", 0.4, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "C", 0.0);
    (void)kent_build_soil(&b, "till", 200e3, 19e3, 1.5);
    b.model->ground.water_table = (double)INFINITY;
    return b;
}

static void a_face_that_the_pipe_runs_through_bears_on_what_is_left(void **state)
{
    (void)state;
    kent_build b = main_that_narrows();
    kent_restraints *r = sized(&b);
    const kent_holding *h = holding_of(&b, r, "B");
    const double hole = 0.25 * PI * 0.62 * 0.62;
    const double thrust = 1.0e6 * (hole - 0.25 * PI * 0.42 * 0.42);
    const double face = h->block.width * h->block.height;

    assert_true(h->held);
    assert_int_equal(h->chosen, KENT_ANCHOR_BLOCK);
    assert_close(h->block.bearing_area, 1.5 * thrust / 200e3, 1e-9);
    assert_true(face >= (h->block.bearing_area + hole) * (1.0 - 1e-5));
    assert_close(h->block.bearing_pressure, 1.5 * thrust / (face - hole), 1e-9);
    kent_hand_expect(h, "undisturbed ground");
    kent_restraints_free(r);
    kent_build_clear(&b);
}

static void every_block_of_many_depths_keeps_the_rules(void **state)
{
    (void)state;
    for (int k = 6; k <= 40; k++) {
        kent_build b = main_that_turns(11.25 * DEGREE, 0.0);
        b.model->ground.cover = 0.1 * k;
        kent_restraints *r = sized(&b);
        const kent_holding *h = holding_of(&b, r, "B");
        const double axis = 0.1 * k + 0.31;
        if (h->held) {
            const double wide = h->block.width / h->block.height;
            assert_true(h->block.height <= axis * 2.0 / 3.0 + 1e-9);
            assert_true(wide >= 1.0 - 1e-9 && wide <= 2.0 + 1e-9);
            assert_true(h->utilisation <= 1.0 + 1e-5);
        } else {
            assert_true(h->block.bearing_area > 0.0);
            assert_true(kent_hand_says(h, "does not fit"));
        }
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_plan_bend_gets_the_face_worked_out_by_hand),
        cmocka_unit_test(a_factor_inside_the_soil_value_multiplies_the_one_applied),
        cmocka_unit_test(weaker_soil_never_gets_a_smaller_face),
        cmocka_unit_test(a_crest_gets_a_weight_that_beats_the_lift),
        cmocka_unit_test(a_crest_in_ground_water_takes_more_concrete),
        cmocka_unit_test(a_sag_gets_a_base_on_the_ground_below),
        cmocka_unit_test(a_sag_that_suction_lifts_hard_gets_a_weight_not_a_pillar),
        cmocka_unit_test(a_turn_in_plan_and_profile_gets_a_weight_and_a_face),
        cmocka_unit_test(a_little_lift_is_left_to_the_weight_of_the_bearing_block),
        cmocka_unit_test(a_face_that_the_pipe_runs_through_bears_on_what_is_left),
        cmocka_unit_test(every_block_of_many_depths_keeps_the_rules),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
