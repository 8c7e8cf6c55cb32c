/* Bearing by every way that a soil states, on slopes, behind fill, in ground of every
 * nature. */
#include "kent_hand.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 0.15e6}};

/* 1.5 p A of the end below, N. */
static double factored(void) { return 1.5 * 0.15e6 * 0.25 * PI * 0.62 * 0.62; }

/* A main of 620 mm along x that ends blank at E, pushed along +x; its axis lies at 1.81
 * m. Till of 19 kN/m3 and 30 degrees that states its bearing in every way. */
static kent_build main_that_ends(kent_bearing_route route)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -300.0, 0.0, 50.0);
    (void)kent_build_point(&b, "E", 0.0, 0.0, 50.0);
    (void)kent_build_pipe(&b, "P", "A E", 0.6, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    b.model->loads.test_pressure = 0.15e6;
    (void)kent_build_soil(&b, "loam", 60e3, 18e3, 1.5); /* the fill of some */
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    kent_soil *s = &b.model->soils[1];
    s->route = route;
    s->by_depth[0] = (kent_depth_row){1.0, 60e3};
    s->by_depth[1] = (kent_depth_row){3.0, 140e3};
    s->by_depth_count = 2;
    s->bearing_gradient = 50e3;
    s->friction_angle = 30.0 * DEGREE;
    s->cohesion = 0.0;
    s->passive_share = 0.5;
    b.model->ground.water_table = (double)INFINITY;
    const int note = kent_build_note(&b, "E");
    b.model->notes[note].restraint = (int)KENT_THRUST_BLOCK;
    return b;
}

static kent_restraints *sized(kent_build *b)
{
    kent_build_derive(b);
    return kent_hand_size(b, TEST, 1);
}

static const kent_holding *at_e(const kent_build *b, const kent_restraints *r)
{
    const kent_holding *h = &r->fittings[kent_build_fitting_of(b, "E")];
    (void)kent_hand_lines(&h->derivation, KENT_SI);
    (void)kent_hand_lines(&h->derivation, KENT_US);
    return h;
}

static void finish(kent_build *b, kent_restraints *r)
{
    kent_restraints_free(r);
    kent_build_clear(b);
}

/* ---- side by side ---------------------------------------------------------------- */

/* At 1.81 m by hand: 150 kPa; 60 + 0.405 x 80 = 92.4; 50 x 1.81 = 90.5; half of 3 x 19
 * x 1.81 = 51.585 kPa. */
static void every_way_is_shown_and_the_soils_own_decides(void **state)
{
    (void)state;
    static const double bearing[] = {150e3, 92.4e3, 90.5e3, 51.585e3};
    static const kent_bearing_route routes[] = {
        KENT_BEARING_CONSTANT, KENT_BEARING_BY_DEPTH, KENT_BEARING_GRADIENT,
        KENT_BEARING_PASSIVE};
    for (size_t decides = 0; decides < 4; decides++) {
        kent_build b = main_that_ends(routes[decides]);
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_e(&b, r);
        assert_true(h->bearing.seen);
        assert_close(h->bearing.stress, 19e3 * 1.81, 1e-12);
        for (size_t k = 0; k < 4; k++) {
            const kent_bearing_way *way = &h->bearing.ways[k];
            assert_true(way->stated && way->decides == (k == decides));
            assert_close(way->bearing, bearing[k], 1e-12);
            assert_close(way->area, factored() / bearing[k], 1e-9);
            assert_close(way->passive, bearing[k] / (19e3 * 1.81), 1e-9);
        }
        assert_false(h->bearing.ways[KENT_WAY_COULOMB].stated);
        assert_close(h->allowable_bearing, bearing[decides], 1e-12);
        assert_true(kent_hand_says(h, "see which is right") == (decides != 3));
        finish(&b, r);
    }
}

static void a_way_that_is_not_stated_is_not_shown(void **state)
{
    (void)state;
    kent_build b = main_that_ends(KENT_BEARING_CONSTANT);
    kent_soil *s = &b.model->soils[1];
    s->by_depth_count = 0;
    s->bearing_gradient = (double)NAN;
    s->passive_share = (double)NAN;
    s->factor_inside = 2.0;
    kent_restraints *r = sized(&b);
    const kent_holding *h = at_e(&b, r);
    for (kent_way k = KENT_WAY_BY_DEPTH; k < KENT_BEARING_WAYS; k++) {
        assert_false(h->bearing.ways[k].stated);
        assert_true(isnan(h->bearing.ways[k].bearing));
    }
    assert_close(h->bearing.factor_inside, 2.0, 0.0);
    assert_close(h->bearing.ways[0].passive, 300e3 / (19e3 * 1.81), 1e-9);
    assert_false(kent_hand_says(h, "see which is right"));
    finish(&b, r);
}

/* ---- Coulomb --------------------------------------------------------------------- */

/* Square to the face 6.105 cos 20 degrees (Coulomb's coefficient of the textbook). */
static void friction_on_the_face_goes_by_coulomb_with_a_warning(void **state)
{
    (void)state;
    for (int pass = 0; pass < 2; pass++) {
        kent_build b = main_that_ends(KENT_BEARING_PASSIVE);
        b.model->soils[1].wall_friction = (pass ? 20.0 : 10.0) * DEGREE;
        b.model->soils[1].cohesion = 4e3;
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_e(&b, r);
        const double kh =
            pass ? 6.105 * cos(20.0 * DEGREE) : 4.143 * cos(10.0 * DEGREE);
        const double own = 2.0 * 4e3 * sqrt(3.0);
        assert_close(h->allowable_bearing, 0.5 * (kh * 19e3 * 1.81 + own), 2e-4);
        assert_true(h->bearing.ways[KENT_WAY_COULOMB].decides);
        assert_close(h->bearing.ways[KENT_WAY_RANKINE].bearing,
                     0.5 * (3.0 * 19e3 * 1.81 + own), 1e-9);
        assert_true(kent_hand_says(h, "Coulomb's plane promises more") == (pass == 1));
        assert_false(kent_hand_says(h, "less the active pressure"));
        if (pass) kent_hand_expect(h, "1.91 of Rankine's");
        kent_hand_expect(h, "what rubs on the face lifts the block");
        finish(&b, r);
    }
}

/* Near 45 degrees of both the root of Coulomb's form reaches 1: nothing is to be
 * leant on, and what would be right is said. */
static void
friction_beyond_what_coulomb_can_tell_is_refused_with_what_would_do(void **state)
{
    (void)state;
    kent_build b = main_that_ends(KENT_BEARING_PASSIVE);
    b.model->soils[1].friction_angle = 48.0 * DEGREE;
    b.model->soils[1].wall_friction = 46.0 * DEGREE;
    kent_restraints *r = sized(&b);
    assert_false(at_e(&b, r)->held);
    kent_hand_expect(at_e(&b, r), "state at most 16.0");
    kent_hand_expect(at_e(&b, r), "or no wall_friction");
    assert_false(kent_hand_says(at_e(&b, r), "give all three"));
    finish(&b, r);
}

/* A soil that rubs gives more than Rankine's by what it states: that is said once. */
static void what_coulomb_counts_on_is_doubted_once(void **state)
{
    (void)state;
    static const kent_hand_case ONCE[] = {{"test", KENT_CASE_TEST, 1.0, 0.15e6}};
    kent_build b = main_that_ends(KENT_BEARING_PASSIVE);
    b.model->soils[1].wall_friction = 20.0 * DEGREE;
    b.model->soils[1].passive_share = 1.0;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, ONCE, 1);
    const kent_holding *h = at_e(&b, r);
    assert_true(h->held);
    kent_hand_expect(h, "state no more than 10.0");
    kent_hand_expect(h, "less the active pressure");
    assert_false(kent_hand_says(h, "asks for a passive coefficient"));
    assert_false(kent_hand_says(h, "one of its values is wrong"));
    finish(&b, r);
}

/* ---- water in the face, active pressure ------------------------------------------ */

/* The tallest face at 1.81 m is 2/3 of that, 1.2067 m; water at its centre takes an
 * eighth of it more off than at the centre. */
static void water_that_cuts_the_face_is_not_taken_at_its_centre(void **state)
{
    (void)state;
    static const double tables[] = {1.81, 1.5, 2.1, 1.0, 2.6};
    for (size_t i = 0; i < sizeof tables / sizeof tables[0]; i++) {
        kent_build b = main_that_ends(KENT_BEARING_PASSIVE);
        b.model->ground.water_table = tables[i];
        kent_restraints *r = sized(&b);
        const double water = b.model->rules.water_unit_weight, h = 1.81 * 2.0 / 3.0;
        const double half = fmax(0.0, 0.5 * h - fabs(1.81 - tables[i]));
        const double stress = 19e3 * 1.81 - water * fmax(0.0, 1.81 - tables[i]) -
                              water * half * half / (2.0 * h);
        assert_close(at_e(&b, r)->allowable_bearing, 0.5 * 3.0 * stress, 1e-9);
        finish(&b, r);
    }
}

/* At 30 degrees the active pressure is a ninth of the passive one. */
static void a_share_beyond_what_is_left_of_the_active_pressure_is_doubted(void **state)
{
    (void)state;
    for (int pass = 0; pass < 2; pass++) {
        kent_build b = main_that_ends(KENT_BEARING_PASSIVE);
        b.model->soils[1].passive_share = pass ? 0.90 : 0.88;
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_e(&b, r);
        assert_close(h->bearing.active / h->bearing.passive, 1.0 / 9.0, 1e-12);
        assert_true(kent_hand_says(h, "less the active pressure") == (pass == 1));
        finish(&b, r);
    }
}

/* ---- slopes ---------------------------------------------------------------------- */

static kent_build on_slope(kent_bearing_route route, double degrees, double azimuth)
{
    kent_build b = main_that_ends(route);
    b.model->notes[0].stated.slope =
        (kent_slope){{cos(azimuth), sin(azimuth), 0.0}, degrees * DEGREE};
    return b;
}

/* At 10 degrees 2.2044 in place of 3 (see test_earth); across the thrust and uphill
 * nothing changes; at 60 degrees to it tan beta is halved. */
static void falling_ground_lowers_a_bearing_by_its_part_along_the_thrust(void **state)
{
    (void)state;
    static const kent_bearing_route routes[] = {KENT_BEARING_PASSIVE,
                                                KENT_BEARING_CONSTANT};
    static const double level[] = {51.585e3, 150e3};
    for (int i = 0; i < 2; i++) {
        kent_build b = on_slope(routes[i], 10.0, 0.0);
        kent_restraints *r = sized(&b);
        assert_close(at_e(&b, r)->allowable_bearing, level[i] * 2.2044 / 3.0, 1e-4);
        kent_hand_expect(at_e(&b, r), "the ground before the face falls by 10.0");
        finish(&b, r);
        for (int k = 0; k < 2; k++) {
            b = on_slope(routes[i], 10.0, k ? PI : 0.5 * PI);
            r = sized(&b);
            assert_close(at_e(&b, r)->allowable_bearing, level[i], 1e-9);
            assert_false(kent_hand_says(at_e(&b, r), "falls by"));
            finish(&b, r);
        }
        b = on_slope(routes[i], 10.0, PI / 3.0);
        r = sized(&b);
        assert_close(at_e(&b, r)->bearing.falls, atan(0.5 * tan(10.0 * DEGREE)), 1e-9);
        finish(&b, r);
        b = on_slope(routes[i], 10.0, PI); /* uphill, but it holds from either side */
        b.model->notes[0].restraint = (int)KENT_ANCHOR_BLOCK;
        r = sized(&b);
        assert_close(at_e(&b, r)->bearing.falls, 10.0 * DEGREE, 1e-9);
        finish(&b, r);
    }
}

static void too_steep_or_unknown_ground_is_refused(void **state)
{
    (void)state;
    kent_build b = on_slope(KENT_BEARING_CONSTANT, 10.0, 0.0);
    b.model->soils[1].friction_angle = (double)NAN;
    kent_restraints *r = sized(&b);
    assert_false(at_e(&b, r)->held);
    kent_hand_expect(at_e(&b, r), "states no friction_angle");
    finish(&b, r);

    b = on_slope(KENT_BEARING_PASSIVE, 30.5, 0.0);
    r = sized(&b);
    assert_false(at_e(&b, r)->held);
    kent_hand_expect(at_e(&b, r), "at which soil 'till' stands by itself");
    finish(&b, r);

    for (int pass = 0; pass < 2; pass++) {
        b = on_slope(KENT_BEARING_CONSTANT, 10.0, 0.0);
        b.model->rules.steepest_ground = (pass ? 9.9 : 10.1) * DEGREE;
        r = sized(&b);
        assert_true(at_e(&b, r)->held == (pass == 0));
        assert_true(kent_hand_says(at_e(&b, r), "these rules allow 9.9") ==
                    (pass == 1));
        finish(&b, r);
    }
}

/* ---- fill behind the face -------------------------------------------------------- */

static void a_face_against_fill_bears_what_the_weaker_does(void **state)
{
    (void)state;
    for (int pass = 0; pass < 2; pass++) {
        kent_build b = main_that_ends(KENT_BEARING_CONSTANT);
        b.model->notes[0].stated.backing = KENT_BACKING_FILL;
        b.model->ground.backfill = 0;
        b.model->soils[0].allowable_bearing = pass ? 60e3 : 200e3;
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_e(&b, r);
        assert_close(h->allowable_bearing, pass ? 60e3 : 150e3, 1e-12);
        assert_true(h->bearing.on_fill == (pass == 1));
        kent_hand_expect(h, "90 to 95 % of Proctor's");
        kent_hand_expect(h, pass ? "the fill decides" : "the ground behind it decides");
        finish(&b, r);
    }
}

static void fill_that_nobody_states_or_that_is_loose_is_refused(void **state)
{
    (void)state;
    for (int pass = 0; pass < 2; pass++) {
        kent_build b = main_that_ends(KENT_BEARING_CONSTANT);
        b.model->notes[0].stated.backing = KENT_BACKING_FILL;
        b.model->soils[0].nature = KENT_FILL;
        b.model->soils[0].unreliable = true;
        if (pass) b.model->ground.backfill = 0;
        kent_restraints *r = sized(&b);
        assert_false(at_e(&b, r)->held);
        kent_hand_expect(at_e(&b, r), pass ? "fill of soil 'loam', which gives no"
                                           : "give ground.backfill");
        finish(&b, r);
    }
}

/* ---- natures --------------------------------------------------------------------- */

static void ground_of_each_nature_is_refused_with_its_own_way_out(void **state)
{
    (void)state;
    static const struct {
        kent_nature nature;
        const char *words;
    } rows[] = {{KENT_FILL, "compacted in layers with its density proved"},
                {KENT_ORGANIC, "replace it through its whole depth"},
                {KENT_EXPANSIVE, "drainage that keeps water away"},
                {KENT_LIQUEFIABLE, "densified or drained"},
                {KENT_COLLAPSIBLE, "drained so that no leak reaches it"}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        for (int joints = 0; joints < 2; joints++) {
            kent_build b = main_that_ends(KENT_BEARING_CONSTANT);
            b.model->soils[1].nature = rows[i].nature;
            b.model->soils[1].unreliable = true;
            if (joints) b.model->notes[0].restraint = (int)KENT_RESTRAINED_JOINTS;
            kent_restraints *r = sized(&b);
            const kent_holding *h = at_e(&b, r);
            assert_false(h->held);
            assert_int_equal(r->not_held, 1);
            assert_true(isnan(h->allowable_bearing));
            assert_false(h->bearing.seen);
            kent_hand_expect(h, rows[i].words);
            kent_hand_expect(h, "made good with proof write unreliable = false");
            kent_hand_expect(h, "carry the restraint more than the 300 m");
            finish(&b, r);
        }
    }
}

/* A case that says so itself is believed, and told so where it is read. */
static void ground_that_was_made_good_counts_again(void **state)
{
    (void)state;
    for (int pass = 0; pass < 2; pass++) {
        kent_build b = main_that_ends(KENT_BEARING_CONSTANT);
        b.model->soils[1].nature = KENT_LIQUEFIABLE;
        b.model->soils[1].unreliable = pass == 1;
        kent_restraints *r = sized(&b);
        assert_true(at_e(&b, r)->held == (pass == 0));
        finish(&b, r);
    }
}

/* What slope takes from a base and from the side of a trench is not worked out: it is
 * said, with what to state. */
static void a_slope_under_a_base_or_beside_restrained_joints_is_told(void **state)
{
    (void)state;
    for (int pass = 0; pass < 4; pass++) {
        const bool joints = pass >= 2, slopes = pass % 2 == 1;
        kent_build b = kent_build_new();
        (void)kent_build_point(&b, "A", -300.0, 0.0, 50.0);
        (void)kent_build_point(&b, "E", 0.0, 0.0, 50.0);
        (void)kent_build_point(&b, "Z", 300.0, joints ? 60.0 : 0.0,
                               joints ? 50.0 : 90.0);
        const int p = kent_build_pipe(&b, "P", "A E Z", 0.6, 1000.0);
        b.model->pipes[p].unit_mass = 150.0;
        (void)kent_build_fixed_level(&b, "A", 150.0);
        (void)kent_build_outflow(&b, "Z", 0.0);
        (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
        kent_soil *s = &b.model->soils[0];
        s->friction_angle = 30.0 * DEGREE;
        s->cohesion = 0.0;
        s->friction_ratio = 0.7;
        s->adhesion_ratio = 0.0;
        s->passive_ratio = 0.5;
        b.model->ground.water_table = (double)INFINITY;
        b.model->loads.test_pressure = 0.15e6;
        const int note = kent_build_note(&b, "E");
        b.model->notes[note].restraint =
            joints ? (int)KENT_RESTRAINED_JOINTS : (int)KENT_THRUST_BLOCK;
        if (slopes) {
            b.model->notes[note].stated.slope =
                (kent_slope){{0.0, -1.0, 0.0}, 20.0 * DEGREE};
        }
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_e(&b, r);
        assert_true(h->held);
        assert_true(kent_hand_says(h, "state a vertical_bearing that holds") ==
                    (slopes && !joints));
        assert_true(kent_hand_says(h, "state a smaller passive_ratio") ==
                    (slopes && joints));
        finish(&b, r);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_way_is_shown_and_the_soils_own_decides),
        cmocka_unit_test(a_way_that_is_not_stated_is_not_shown),
        cmocka_unit_test(friction_on_the_face_goes_by_coulomb_with_a_warning),
        cmocka_unit_test(water_that_cuts_the_face_is_not_taken_at_its_centre),
        cmocka_unit_test(a_share_beyond_what_is_left_of_the_active_pressure_is_doubted),
        cmocka_unit_test(falling_ground_lowers_a_bearing_by_its_part_along_the_thrust),
        cmocka_unit_test(too_steep_or_unknown_ground_is_refused),
        cmocka_unit_test(a_face_against_fill_bears_what_the_weaker_does),
        cmocka_unit_test(fill_that_nobody_states_or_that_is_loose_is_refused),
        cmocka_unit_test(
            friction_beyond_what_coulomb_can_tell_is_refused_with_what_would_do),
        cmocka_unit_test(what_coulomb_counts_on_is_doubted_once),
        cmocka_unit_test(ground_that_was_made_good_counts_again),
        cmocka_unit_test(a_slope_under_a_base_or_beside_restrained_joints_is_told),
        cmocka_unit_test(ground_of_each_nature_is_refused_with_its_own_way_out),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
