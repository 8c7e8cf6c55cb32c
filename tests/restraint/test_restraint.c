/* What governs, what is refused and with which words, and restrained joints. */
#include "kent_hand.h"

#include <stdlib.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6}};

/* Points every 100 m: A, B, C, D, E along x; at C the main turns left by 22.5 degrees.
 * Bore 600, outside 620 mm; soil "till" 150 kPa with everything that restrained lengths
 * need; cover 1.5 m; pipes of 6 m. */
static kent_build main_of_five(void)
{
    kent_build b = kent_build_new();
    const double c = 100.0 * cos(22.5 * DEGREE), s = 100.0 * sin(22.5 * DEGREE);

    (void)kent_build_point(&b, "A", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "B", 100.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "D", 200.0 + c, s, 50.0);
    (void)kent_build_point(&b, "E", 200.0 + 2.0 * c, 2.0 * s, 50.0);
    const int p = kent_build_pipe(&b, "P", "A B C D E", 0.6, 1000.0);
    b.model->pipes[p].laying_length = 6.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    const int t = kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    kent_soil *till = &b.model->soils[t];
    till->friction_angle = 30.0 * DEGREE;
    till->cohesion = 0.0;
    till->friction_ratio = 0.75;
    till->passive_ratio = 0.6;
    b.model->ground.water_table = (double)INFINITY;
    return b;
}

static const kent_holding *holding_of(const kent_build *b, const kent_restraints *r,
                                      const char *id)
{
    return &r->fittings[kent_build_fitting_of(b, id)];
}

static void ask_for_joints(kent_build *b, const char *at)
{
    const int note = kent_build_note(b, at);
    b->model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
}

static void finish(kent_build *b, kent_restraints *r)
{
    kent_restraints_free(r);
    kent_build_clear(b);
}

/* ---- what governs ---------------------------------------------------------------- */

static void the_greatest_factored_load_governs_not_the_greatest_thrust(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.2, 1.2e6},
                                           {"steady", KENT_CASE_STEADY, 1.5, 0.5e6},
                                           {"shut", KENT_CASE_OCCASIONAL, 1.5, 1.0e6}};
    kent_build b = main_of_five();
    (void)kent_build_scenario(&b, "shut", 60.0);
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, cases, 3);
    const kent_holding *h = holding_of(&b, r, "C");
    const double per_pascal = 2.0 * 0.25 * PI * 0.62 * 0.62 * sin(11.25 * DEGREE);

    assert_int_equal(h->governing, 2);
    assert_int_equal(h->runner_up, 0);
    assert_close(h->design_thrust, 1.5 * 1.0e6 * per_pascal, 1e-9);
    assert_close(h->runner_up_load, 1.2 * 1.2e6 * per_pascal, 1e-9);
    assert_close(h->factor_asked, 1.5, 1e-15);
    finish(&b, r);
}

static void of_equal_loads_the_case_listed_first_governs(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 0.9e6},
                                           {"static", KENT_CASE_STATIC, 1.5, 1.0e6},
                                           {"steady", KENT_CASE_STEADY, 1.5, 1.0e6}};
    kent_build b = main_of_five();
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, cases, 3);

    assert_int_equal(holding_of(&b, r, "C")->governing, 1);
    assert_int_equal(holding_of(&b, r, "C")->runner_up, 2);
    finish(&b, r);
}

/* Two cases on one combined bend, one pushing harder sideways and one harder upwards.
 */
static void each_sense_keeps_its_own_governing_case(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6},
                                           {"static", KENT_CASE_STATIC, 1.5, 1.0e6}};
    kent_build b = main_of_five();
    b.model->points[2].at.z += 10.0;
    kent_build_derive(&b);
    kent_loads_result loads = kent_hand_loads(b.model, cases, 2);
    const int c = kent_build_fitting_of(&b, "C");
    kent_load_case *still = &loads.fittings[c].cases[1];
    still->worst[KENT_UPWARD].balance.thrust.z *= 1.1;
    kent_restraints *r = NULL;
    kent_error err = {0};
    assert_int_equal(kent_restraint_size(b.model, &loads, &r, &err), KENT_OK);
    const kent_holding *h = &r->fittings[c];

    assert_int_equal(h->by_sense[KENT_SIDEWAYS], 0);
    assert_int_equal(h->by_sense[KENT_UPWARD], 1);
    assert_int_equal(h->by_sense[KENT_DOWNWARD], -1);
    assert_int_equal(h->governing, h->by_sense[h->sense]);
    assert_true(h->block.volume * 23e3 >=
                1.5 * still->worst[KENT_UPWARD].balance.thrust.z);
    kent_hand_clear(&loads);
    finish(&b, r);
}

/* A surge that pushes less but for a moment changes its flow violently. */
static void the_force_of_changing_flow_never_governs(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6},
                                           {"shut", KENT_CASE_OCCASIONAL, 1.5, 0.9e6}};
    kent_build b = main_of_five();
    (void)kent_build_scenario(&b, "shut", 60.0);
    kent_build_derive(&b);
    kent_loads_result loads = kent_hand_loads(b.model, cases, 2);
    const int c = kent_build_fitting_of(&b, "C");
    for (int k = KENT_RESULTANT; k <= KENT_SIDEWAYS; k++) {
        kent_balance *moved = &loads.fittings[c].cases[1].worst[k].balance;
        moved->unsteady = kent_vec3_scale(0.5, moved->thrust);
        moved->thrust = kent_vec3_add(moved->thrust, moved->unsteady);
    }
    kent_restraints *r = NULL;
    kent_error err = {0};
    assert_int_equal(kent_restraint_size(b.model, &loads, &r, &err), KENT_OK);
    const kent_holding *h = &r->fittings[c];

    assert_int_equal(h->governing, 0);
    assert_int_equal(h->by_sense[KENT_RESULTANT], 0);
    assert_close(h->runner_up_load, 0.9 * h->design_thrust, 1e-12);
    kent_hand_clear(&loads);
    finish(&b, r);
}

/* A face bears outwards alone; what suction pulls inwards is left to the reader, with
 * its size. */
static void a_pull_the_other_way_is_said(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6},
                                           {"shut", KENT_CASE_OCCASIONAL, 1.5, 0.5e6}};
    for (int sucked = 0; sucked <= 1; sucked++) {
        kent_build b = main_of_five();
        (void)kent_build_scenario(&b, "shut", 60.0);
        kent_build_derive(&b);
        kent_loads_result loads = kent_hand_loads(b.model, cases, 2);
        const int c = kent_build_fitting_of(&b, "C");
        kent_load_case *shut = &loads.fittings[c].cases[1];
        shut->lowest = shut->worst[KENT_RESULTANT];
        if (sucked) { /* -0.08 MPa: 2 x 80 kPa x 0.3019 m2 x sin(11.25 deg) = 9.4 kN */
            kent_balance *low = &shut->lowest.balance;
            low->thrust = kent_vec3_scale(-0.16, low->thrust);
        }
        kent_restraints *r = NULL;
        kent_error err = {0};
        assert_int_equal(kent_restraint_size(b.model, &loads, &r, &err), KENT_OK);
        const kent_holding *h = &r->fittings[c];
        assert_true(kent_hand_says(h, "pulls the other way") == (sucked == 1));
        if (sucked) kent_hand_expect(h, "'shut' pulls the other way, with 9.4 kN");
        kent_hand_clear(&loads);
        finish(&b, r);
    }
}

/* The pipe ends there, and so does its trench. */
static void an_outlet_valve_does_not_push_along_its_trench(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    const int outlet = kent_build_valve(&b, "VE", "E", 0.05, 8.5);
    b.model->valves[outlet].size = 0.6;
    b.model->ground.cover = 2.0;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);

    assert_true(holding_of(&b, r, "E")->held);
    assert_false(kent_hand_says(holding_of(&b, r, "E"), "along a trench"));
    finish(&b, r);
}

static void a_surge_above_the_test_pressure_is_said(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6},
                                           {"shut", KENT_CASE_OCCASIONAL, 1.5, 1.2e6}};
    kent_build b = main_of_five();
    (void)kent_build_scenario(&b, "shut", 60.0);
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, cases, 2);

    kent_hand_expect(
        holding_of(&b, r, "C"),
        "'shut' reaches 12.00 bar here, above the test pressure of 10.00 bar");
    finish(&b, r);
}

static void a_governing_peak_of_a_knock_or_of_one_step_is_said(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6},
                                           {"shut", KENT_CASE_OCCASIONAL, 1.5, 1.2e6}};
    static const struct {
        double lasts, step; /* s */
        const char *says;   /* NULL: nothing */
    } peaks[] = {{0.05, 0.01, "above 90 % of it for 0.050 s"},
                 {0.11, 0.01, NULL},
                 {0.25, 0.25, "above 90 % of it for 0.250 s"},
                 {0.50, 0.25, NULL}};

    for (size_t i = 0; i < sizeof peaks / sizeof peaks[0]; i++) {
        kent_build b = main_of_five();
        (void)kent_build_scenario(&b, "shut", 60.0);
        kent_build_derive(&b);
        kent_loads_result loads = kent_hand_loads(b.model, cases, 2);
        const int c = kent_build_fitting_of(&b, "C");
        kent_load_case *shut = &loads.fittings[c].cases[1];
        kent_restraints *r = NULL;
        kent_error err = {0};
        shut->above_90_percent = peaks[i].lasts;
        shut->step = peaks[i].step;
        assert_int_equal(kent_restraint_size(b.model, &loads, &r, &err), KENT_OK);
        const kent_holding *h = &r->fittings[c];
        assert_int_equal(h->governing, 1);
        if (peaks[i].says) kent_hand_expect(h, peaks[i].says);
        assert_true(kent_hand_says(h, "peak is short") == (peaks[i].says != NULL));
        kent_hand_clear(&loads);
        finish(&b, r);
    }
}

/* 300 kPa on 19 kN/m3 at 1.81 m is 8.7 times the weight of the soil above; with half of
 * it inside as a factor the same again. */
static void bearing_that_the_depth_cannot_give_is_doubted(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->soils[0].allowable_bearing = 150e3;
    b.model->soils[0].factor_inside = 2.0;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    kent_hand_expect(holding_of(&b, r, "C"),
                     "passive coefficient of 8.7; its friction angle gives 3.0");
    finish(&b, r);

    b = main_of_five();
    kent_build_derive(&b);
    r = kent_hand_size(&b, TEST, 1);
    assert_false(kent_hand_says(holding_of(&b, r, "C"), "passive coefficient"));
    finish(&b, r);

    for (int over = 0; over < 2; over++) { /* 4.6 times is the limit */
        b = main_of_five();
        b.model->soils[0].allowable_bearing = (over ? 4.61 : 4.59) * 19e3 * 1.81;
        kent_build_derive(&b);
        r = kent_hand_size(&b, TEST, 1);
        assert_true(kent_hand_says(holding_of(&b, r, "C"), "passive coefficient") ==
                    (over > 0));
        finish(&b, r);
    }
}

static void a_bearing_is_doubted_without_a_unit_weight_too(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->soils[0].allowable_bearing = 170e3; /* on 18.85 kN/m3 x 1.81 m: 4.98 */
    b.model->soils[0].unit_weight = (double)NAN;
    b.model->soils[0].friction_angle = (double)NAN;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    kent_hand_expect(holding_of(&b, r, "C"),
                     "passive coefficient of 5.0, which is unlikely (40 degrees give "
                     "4.6); its unit weight is not given, 18.9 kN/m³ is assumed");
    finish(&b, r);
}

/* CIRIA Report 128, Guide to the design of thrust blocks (1994), stops at about 1000
 * kN. */
static void concrete_beyond_a_thousand_kilonewtons_wants_designing(void **state)
{
    (void)state;
    const double per_pascal = 2.0 * 0.25 * PI * 0.62 * 0.62 * sin(11.25 * DEGREE);
    for (int over = 0; over < 2; over++) {
        const double load = over ? 1010e3 : 990e3; /* N, factored */
        const kent_hand_case cases[] = {
            {"test", KENT_CASE_TEST, 1.5, load / 1.5 / per_pascal}};
        kent_build b = main_of_five();
        b.model->soils[0].allowable_bearing = 1e6;
        kent_build_derive(&b);
        kent_restraints *r = kent_hand_size(&b, cases, 1);
        const kent_holding *h = holding_of(&b, r, "C");
        assert_true(h->held);
        assert_close(h->design_thrust, load, 1e-9);
        assert_true(kent_hand_says(h, "concrete itself must be designed") ==
                    (over > 0));
        finish(&b, r);
    }
}

/* ---- nothing needed, nothing asked ----------------------------------------------- */

static void a_turn_that_the_joint_takes_is_listed_and_not_held(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->pipes[0].joint_deflection = 25.0 * DEGREE;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");

    assert_true(h->needs_nothing);
    assert_true(h->design_thrust > 100e3);
    assert_int_equal(h->block.type, KENT_BLOCK_NONE);
    kent_hand_expect(h, "within what the joint takes");
    assert_close(r->concrete, holding_of(&b, r, "E")->block.volume, 1e-12);
    finish(&b, r);
}

static void a_thrust_of_less_than_half_a_kilonewton_needs_nothing(void **state)
{
    (void)state;
    const double per_pascal = 2.0 * 0.25 * PI * 0.62 * 0.62 * sin(11.25 * DEGREE);

    for (int over = 0; over < 2; over++) {
        const kent_hand_case faint[] = {
            {"steady", KENT_CASE_STEADY, 1.5, (over ? 501.0 : 499.0) / per_pascal}};
        kent_build b = main_of_five();
        kent_build_derive(&b);
        kent_restraints *r = kent_hand_size(&b, faint, 1);
        assert_true(holding_of(&b, r, "C")->needs_nothing == (over == 0));
        finish(&b, r);
    }
}

static void no_restraint_on_purpose_is_said_but_not_counted(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    const int note = kent_build_note(&b, "C");
    b.model->notes[note].restraint = KENT_NO_RESTRAINT;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");

    assert_false(h->held);
    kent_hand_expect(h, "restraint \"none\" is asked for");
    assert_true(isnan(h->factor_reached) != 0);
    const kent_holding *end = holding_of(&b, r, "E");
    assert_int_equal(r->not_held, end->held ? 0 : 1);
    finish(&b, r);
}

static void what_a_wall_piece_is_pushed_its_structure_has_to_hold(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    const int note = kent_build_note(&b, "C");
    b.model->notes[note].role = KENT_ROLE_WALL;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");

    assert_false(h->held);
    kent_hand_expect(h, "the structure that the main is built into has to hold");
    finish(&b, r);
}

/* ---- refusals -------------------------------------------------------------------- */

static void
without_soil_or_cover_there_is_no_block_and_it_says_what_to_give(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->ground.soil = -1;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    assert_false(holding_of(&b, r, "C")->held);
    kent_hand_expect(holding_of(&b, r, "C"),
                     "the soil is not stated; give ground.soil");
    finish(&b, r);

    b = main_of_five();
    b.model->ground.cover = (double)NAN;
    kent_build_derive(&b);
    r = kent_hand_size(&b, TEST, 1);
    assert_false(holding_of(&b, r, "C")->held);
    assert_true(isnan(holding_of(&b, r, "C")->restrained_length) != 0);
    kent_hand_expect(holding_of(&b, r, "C"),
                     "the cover is not stated; give ground.cover");
    finish(&b, r);
}

static void less_than_the_least_cover_is_refused(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->ground.cover = 0.5;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");

    assert_false(h->held);
    kent_hand_expect(h, "a cover of 0.50 m is less than the least, 0.60 m");
    kent_hand_expect(h, "restrained joints over");
    assert_int_equal(r->not_held, 2); /* C and the dead end E */
    finish(&b, r);
}

/* B and C lie in peat: from C it is 200 m back to A and 100 m on to D. */
static void in_peat_it_says_how_far_it_is_to_sound_ground_on_each_side(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    const int peat = kent_build_soil(&b, "peat", 0.0, 12e3, 1.5);
    b.model->soils[peat].unreliable = true;
    b.model->ground.soil = 0;
    b.model->points[1].soil = peat;
    b.model->points[2].soil = peat;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");

    assert_false(h->held);
    assert_int_equal(h->block.type, KENT_BLOCK_NONE);
    assert_int_equal(h->leg_count, 0);
    assert_true(isnan(h->factor_reached) != 0);
    kent_hand_expect(h, "'peat', gives no restraint");
    kent_hand_expect(h, "200 m towards B into the till at A");
    kent_hand_expect(h, "100 m towards D into the till at D");
    kent_hand_expect(h, "or support the fitting on piles");
    finish(&b, r);
}

static void peat_to_the_end_of_a_pipe_is_said_to_be_so(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    const int peat = kent_build_soil(&b, "peat", 0.0, 12e3, 1.5);
    b.model->ground.soil = 0;
    for (int i = 2; i < 5; i++) {
        b.model->points[i].soil = peat;
    }
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);

    kent_hand_expect(holding_of(&b, r, "C"), "100 m towards B into the till at B");
    kent_hand_expect(holding_of(&b, r, "C"), "more than the 200 m of pipe towards D");
    finish(&b, r);
}

/* 1.178 m2 x 3 is 3.534 m2; at 1.5 m of cover the most is 1.20 x 2.40 = 2.88 m2. The
 * help offered is then tried: with that cover, and with that bearing, there is a block.
 */
static void what_is_said_to_help_a_face_too_large_does_help(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->soils[0].allowable_bearing = 50e3;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");
    double cover = 0.0, bearing = 0.0;

    assert_false(h->held);
    kent_hand_expect(h, "does not fit");
    const char *cover_at = strstr(h->cautions.text[0], "a cover of ");
    const char *bearing_at = strstr(h->cautions.text[0], "ground that bears ");
    assert_non_null(cover_at);
    assert_non_null(bearing_at);
    cover = strtod(cover_at + strlen("a cover of "), NULL);
    bearing = strtod(bearing_at + strlen("ground that bears "), NULL); /* kPa, 0.1 */
    finish(&b, r);

    b = main_of_five();
    b.model->soils[0].allowable_bearing = 50e3;
    b.model->ground.cover = cover;
    kent_build_derive(&b);
    r = kent_hand_size(&b, TEST, 1);
    assert_true(holding_of(&b, r, "C")->held);
    finish(&b, r);

    b = main_of_five();
    b.model->soils[0].allowable_bearing = (bearing + 0.1) * 1e3;
    kent_build_derive(&b);
    r = kent_hand_size(&b, TEST, 1);
    assert_true(holding_of(&b, r, "C")->held);
    finish(&b, r);
}

static void where_no_cover_would_serve_the_help_begins_with_better_ground(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 80.0e6}};
    kent_build b = main_of_five();
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, cases, 1);

    kent_hand_expect(holding_of(&b, r, "C"), "at this depth; ground that bears");
    finish(&b, r);
}

static void a_block_larger_than_the_rules_allow_is_refused(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->rules.largest_volume = 0.4;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");

    assert_false(h->held);
    kent_hand_expect(h, "larger than the 0.40 m³");
    assert_close(1.0 + h->block.volume, 1.0, 1e-15);
    finish(&b, r);
}

/* ---- restrained joints ----------------------------------------------------------- */

/* Worked out beside the program: friction angle 30 degrees x 0.75, iron 7050 kg/m3. */
static void a_bend_s_length_is_rounded_up_to_whole_pipes(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    ask_for_joints(&b, "C");
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");
    const double earth = 19e3 * 1.5 * 0.62, iron = PI * 0.61 * 0.01 * 7050.0 * 9.80665;
    const double water = 1000.0 * 9.80665 * 0.25 * PI * 0.36;
    const double friction = (2.0 * earth + iron + water) * tan(22.5 * DEGREE);
    const double side = 0.6 * 3.0 * 19e3 * (1.5 + 0.31) * 0.62;
    const double length = 1.5 * 1.0e6 * 0.25 * PI * 0.62 * 0.62 * tan(11.25 * DEGREE) /
                          (friction + 0.5 * side);

    assert_true(h->held);
    assert_int_equal(h->leg_count, 2);
    assert_close(h->legs[0].length, length, 1e-9);
    assert_close(h->legs[1].length, length, 1e-9);
    assert_close(h->restrained_length, length, 1e-9);
    assert_int_equal(h->legs[0].pipes, (int)ceil(length / 6.0));
    assert_close(h->factor_reached, 1.5 * ceil(length / 6.0) * 6.0 / length, 1e-9);
    assert_close(h->utilisation, length / (ceil(length / 6.0) * 6.0), 1e-9);
    assert_int_equal(h->block.type, KENT_BLOCK_NONE);
    finish(&b, r);
}

/* tan(theta/2) of the handbook's form grows without bound towards a return bend. */
static void beyond_a_right_angle_a_bend_draws_its_legs_along(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    const kent_vec3 left = b.model->points[1].at, corner = b.model->points[2].at;
    b.model->points[3].at = kent_vec3_add(left, (kent_vec3){0.0, 0.5, 0.0});
    ask_for_joints(&b, "C");
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");
    const double earth = 19e3 * 1.5 * 0.62, iron = PI * 0.61 * 0.01 * 7050.0 * 9.80665;
    const double water = 1000.0 * 9.80665 * 0.25 * PI * 0.36;
    const double friction = (2.0 * earth + iron + water) * tan(22.5 * DEGREE);

    assert_true(kent_vec3_length(kent_vec3_sub(left, corner)) > 50.0);
    assert_true(b.model->fittings[kent_build_fitting_of(&b, "C")].angle >
                170.0 * DEGREE);
    assert_int_equal(h->leg_count, 2);
    assert_close(h->legs[0].length, 1.5 * 1.0e6 * 0.25 * PI * 0.62 * 0.62 / friction,
                 1e-9);
    finish(&b, r);
}

static double length_at_c(kent_build *b)
{
    kent_build_derive(b);
    kent_restraints *r = kent_hand_size(b, TEST, 1);
    const double length = holding_of(b, r, "C")->restrained_length;
    finish(b, r);
    return length;
}

static void sleeves_ground_water_and_crests_take_longer_lengths(void **state)
{
    (void)state;
    kent_build plain = main_of_five(), sleeved = main_of_five(), wet = main_of_five();
    kent_build crest = main_of_five(), sag = main_of_five();

    sleeved.model->ground.wrapped = true;
    wet.model->ground.water_table = 0.5;
    crest.model->points[2].at.z += 5.0;
    sag.model->points[2].at.z -= 5.0;
    const double length = length_at_c(&plain);
    assert_true(length_at_c(&sleeved) > length);
    assert_true(length_at_c(&wet) > length);
    const double lifted = length_at_c(&crest), pressed = length_at_c(&sag);
    assert_true(lifted > 1.5 * pressed); /* the trench side helps the sag alone */
}

/* Soil and pipe are buoyed: 19 kN/m3 and the pipe's weight less the water's. */
static void in_ground_water_the_length_follows_from_buoyed_weights(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->ground.water_table = 2.0; /* m: above the bottom of the pipe at 2.12 m */
    const double water = b.model->rules.water_unit_weight; /* N/m3 */
    const double bore = 1000.0 * 9.80665 * 0.25 * PI * 0.36;
    const double iron = PI * 0.61 * 0.01 * 7050.0 * 9.80665;
    const double weight = 2.0 * (19e3 - water) * 1.5 * 0.62 + iron + bore -
                          water * 0.25 * PI * 0.62 * 0.62; /* N/m */
    const double side = 0.6 * 3.0 * (19e3 - water) * (1.5 + 0.31) * 0.62;
    const double length = 1.5 * 1.0e6 * 0.25 * PI * 0.62 * 0.62 * tan(11.25 * DEGREE) /
                          (weight * tan(22.5 * DEGREE) + 0.5 * side);

    assert_close(length_at_c(&b), length, 1e-9);
}

static void missing_soil_values_are_named_and_no_length_is_given(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->soils[0].friction_ratio = (double)NAN;
    b.model->soils[0].passive_ratio = (double)NAN;
    ask_for_joints(&b, "C");
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");

    assert_false(h->held);
    assert_int_equal(h->leg_count, 0);
    assert_true(isnan(h->restrained_length) != 0);
    kent_hand_expect(h, "soil 'till' lacks friction_ratio, passive_ratio; give it in "
                        "soils, or write restraint = \"thrust-block\"");
    finish(&b, r);

    b = main_of_five();
    kent_soil *till = &b.model->soils[0];
    till->unit_weight = till->friction_angle = till->cohesion = (double)NAN;
    till->friction_ratio = till->adhesion_ratio = till->passive_ratio = (double)NAN;
    kent_build_derive(&b);
    r = kent_hand_size(&b, TEST, 1);
    assert_true(kent_hand_remarks(
        holding_of(&b, r, "C"), /* all of them in one go */
        "lacks unit_weight, friction_angle, cohesion, friction_ratio, "
        "adhesion_ratio, passive_ratio"));
    finish(&b, r);
}

static void adhesion_is_not_asked_for_where_there_is_no_cohesion(void **state)
{
    (void)state;
    kent_build b = main_of_five(), sticky = main_of_five();
    b.model->soils[0].adhesion_ratio = (double)NAN;
    assert_true(length_at_c(&b) > 0.0);
    sticky.model->soils[0].cohesion = 5e3;
    sticky.model->soils[0].adhesion_ratio = (double)NAN;
    assert_true(isnan(length_at_c(&sticky)) != 0);
}

static void soil_without_any_friction_gives_no_length(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    b.model->soils[0].friction_angle = 0.0;
    b.model->soils[0].passive_ratio = 0.0;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");

    assert_int_equal(h->leg_count, 0);
    assert_true(isnan(h->restrained_length) != 0);
    assert_true(h->held);
    assert_true(kent_hand_remarks(h, "makes no friction on the pipe"));
    assert_false(kent_hand_says(h, "no restrained length"));
    finish(&b, r);
}

/* A tee of the same main at T, 10 m from the bend, whose length is longer. */
static void a_length_that_meets_a_tee_does_not_fit(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "T", 190.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "D", 200.0, 300.0, 50.0);
    (void)kent_build_point(&b, "S", 190.0, -50.0, 50.0);
    (void)kent_build_pipe(&b, "P", "A T C D", 0.6, 1000.0);
    (void)kent_build_pipe(&b, "Q", "T S", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    const int t = kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    b.model->soils[t].friction_angle = 30.0 * DEGREE;
    b.model->soils[t].cohesion = 0.0;
    b.model->soils[t].friction_ratio = 0.75;
    b.model->soils[t].passive_ratio = 0.6;
    b.model->ground.water_table = (double)INFINITY;
    ask_for_joints(&b, "C");
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");
    const kent_holding *tee = holding_of(&b, r, "T");

    assert_true(h->restrained_length > 10.0);
    assert_int_equal(h->leg_count, 2);
    assert_false(h->legs[0].fits);
    assert_true(h->legs[1].fits);
    assert_false(h->held);
    kent_hand_expect(h, "reaches T");
    assert_int_equal(tee->leg_count, 1); /* its branch alone */
    assert_int_equal(tee->legs[0].port, 2);
    finish(&b, r);
}

static void a_length_that_runs_into_peat_does_not_fit(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    const int peat = kent_build_soil(&b, "peat", 0.0, 12e3, 1.5);
    b.model->ground.soil = 0;
    b.model->points[3].soil = peat;
    b.model->points[3].at = b.model->points[2].at;
    b.model->points[3].at.x += 2.0 * cos(22.5 * DEGREE); /* 2 m beyond the bend */
    b.model->points[3].at.y += 2.0 * sin(22.5 * DEGREE);
    ask_for_joints(&b, "C");
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "C");

    assert_true(h->legs[0].fits);
    assert_false(h->legs[1].fits);
    assert_false(h->held);
    kent_hand_expect(h, "runs into ground at D");
    finish(&b, r);
}

/* A 600 mm main goes over to 500 mm at C, in line or turning by `turn` (rad). */
static kent_build main_that_narrows(double turn)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 300.0, 0.0, 50.0);
    (void)kent_build_point(&b, "D", 300.0 + 300.0 * cos(turn), 300.0 * sin(turn), 50.0);
    (void)kent_build_pipe(&b, "P", "A C", 0.6, 1000.0);
    (void)kent_build_pipe(&b, "Q", "C D", 0.5, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    const int t = kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    b.model->soils[t].friction_angle = 30.0 * DEGREE;
    b.model->soils[t].cohesion = 0.0;
    b.model->soils[t].friction_ratio = 0.75;
    b.model->ground.water_table = (double)INFINITY;
    ask_for_joints(&b, "C");
    kent_build_derive(&b);
    return b;
}

/* In line the legs pull and push on one axis; a turn pulls on both, as at a bend. */
static void a_reducer_is_held_by_either_leg_unless_it_turns(void **state)
{
    (void)state;
    kent_build straight = main_that_narrows(0.0);
    kent_restraints *r = kent_hand_size(&straight, TEST, 1);
    kent_hand_expect(holding_of(&straight, r, "C"), "on either leg alone");
    finish(&straight, r);

    kent_build turned = main_that_narrows(45.0 * DEGREE);
    r = kent_hand_size(&turned, TEST, 1);
    kent_hand_expect(holding_of(&turned, r, "C"), "on each leg");
    finish(&turned, r);
}

static void a_dead_end_is_held_by_friction_alone(void **state)
{
    (void)state;
    kent_build b = main_of_five();
    ask_for_joints(&b, "E");
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "E");
    const kent_line *fs = kent_derivation_find(&h->derivation, "Fs");

    assert_int_equal(h->leg_count, 1);
    assert_non_null(fs);
    assert_close(h->restrained_length,
                 1.5 * 1.0e6 * 0.25 * PI * 0.62 * 0.62 / fs->value, 1e-9);
    assert_null(kent_derivation_find(&h->derivation, "Rs"));
    finish(&b, r);
}

/* 1 MPa on 0.32 m: a fitting that states its own ports and stands in no pipe. */
static void a_fitting_without_a_network_gets_a_block_and_no_length(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    const kent_vec3 from = {-1.0, 0.0, 0.0}, to = {0.0, 1.0, 0.0};
    const kent_port ports[] = {kent_build_port(from, 1.0e6, 0.0, 0.32),
                               kent_build_port(to, 1.0e6, 0.0, 0.32)};
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    (void)kent_build_ports(&b, "B7", KENT_BEND, ports, 2);
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, TEST, 1);
    const kent_holding *h = holding_of(&b, r, "B7");

    assert_true(h->held);
    assert_close(h->design_thrust, 1.5 * 1.0e6 * sqrt(2.0) * 0.25 * PI * 0.32 * 0.32,
                 1e-9);
    assert_int_equal(h->leg_count, 0);
    assert_true(kent_hand_remarks(h, "stands in no pipe of the case"));
    finish(&b, r);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_greatest_factored_load_governs_not_the_greatest_thrust),
        cmocka_unit_test(of_equal_loads_the_case_listed_first_governs),
        cmocka_unit_test(each_sense_keeps_its_own_governing_case),
        cmocka_unit_test(the_force_of_changing_flow_never_governs),
        cmocka_unit_test(a_pull_the_other_way_is_said),
        cmocka_unit_test(an_outlet_valve_does_not_push_along_its_trench),
        cmocka_unit_test(a_surge_above_the_test_pressure_is_said),
        cmocka_unit_test(a_governing_peak_of_a_knock_or_of_one_step_is_said),
        cmocka_unit_test(bearing_that_the_depth_cannot_give_is_doubted),
        cmocka_unit_test(a_bearing_is_doubted_without_a_unit_weight_too),
        cmocka_unit_test(concrete_beyond_a_thousand_kilonewtons_wants_designing),
        cmocka_unit_test(a_turn_that_the_joint_takes_is_listed_and_not_held),
        cmocka_unit_test(a_thrust_of_less_than_half_a_kilonewton_needs_nothing),
        cmocka_unit_test(no_restraint_on_purpose_is_said_but_not_counted),
        cmocka_unit_test(what_a_wall_piece_is_pushed_its_structure_has_to_hold),
        cmocka_unit_test(
            without_soil_or_cover_there_is_no_block_and_it_says_what_to_give),
        cmocka_unit_test(less_than_the_least_cover_is_refused),
        cmocka_unit_test(in_peat_it_says_how_far_it_is_to_sound_ground_on_each_side),
        cmocka_unit_test(peat_to_the_end_of_a_pipe_is_said_to_be_so),
        cmocka_unit_test(what_is_said_to_help_a_face_too_large_does_help),
        cmocka_unit_test(where_no_cover_would_serve_the_help_begins_with_better_ground),
        cmocka_unit_test(a_block_larger_than_the_rules_allow_is_refused),
        cmocka_unit_test(a_bend_s_length_is_rounded_up_to_whole_pipes),
        cmocka_unit_test(beyond_a_right_angle_a_bend_draws_its_legs_along),
        cmocka_unit_test(sleeves_ground_water_and_crests_take_longer_lengths),
        cmocka_unit_test(in_ground_water_the_length_follows_from_buoyed_weights),
        cmocka_unit_test(missing_soil_values_are_named_and_no_length_is_given),
        cmocka_unit_test(adhesion_is_not_asked_for_where_there_is_no_cohesion),
        cmocka_unit_test(soil_without_any_friction_gives_no_length),
        cmocka_unit_test(a_length_that_meets_a_tee_does_not_fit),
        cmocka_unit_test(a_length_that_runs_into_peat_does_not_fit),
        cmocka_unit_test(a_reducer_is_held_by_either_leg_unless_it_turns),
        cmocka_unit_test(a_dead_end_is_held_by_friction_alone),
        cmocka_unit_test(a_fitting_without_a_network_gets_a_block_and_no_length),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
