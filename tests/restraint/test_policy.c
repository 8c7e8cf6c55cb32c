/* What rules make of blocks, and block and joints for a share each. */
#include "kent_hand.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 0.2e6}};

static double factored(void) { return 1.5 * 0.2e6 * 0.25 * PI * 0.62 * 0.62; }

/* A main of 620 mm along x, 400 m, that ends blank at E; in `rise` it goes over a crest
 * at E instead. Everything is stated that restrained joints want. */
static kent_build main_with(kent_block_policy blocks, kent_restraint_choice choice,
                            double share, bool crest)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -400.0, 0.0, crest ? 10.0 : 50.0);
    (void)kent_build_point(&b, "E", 0.0, 0.0, 50.0);
    if (crest) (void)kent_build_point(&b, "Z", 400.0, 0.0, 10.0);
    const int p = kent_build_pipe(&b, "P", crest ? "A E Z" : "A E", 0.6, 1000.0);
    b.model->pipes[p].unit_mass = 150.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    b.model->loads.test_pressure = 0.2e6;
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    kent_soil *s = &b.model->soils[0];
    s->friction_angle = 30.0 * DEGREE;
    s->cohesion = 0.0;
    s->friction_ratio = 0.7;
    s->adhesion_ratio = 0.0;
    s->passive_ratio = 0.5;
    b.model->ground.water_table = (double)INFINITY;
    b.model->rules.blocks = blocks;
    (void)snprintf(b.model->rules.id, sizeof b.model->rules.id, "town");
    const int note = kent_build_note(&b, "E");
    b.model->notes[note].restraint = (int)choice;
    b.model->notes[note].stated.block_share = share;
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

static void where_blocks_are_forbidden_joints_take_their_place(void **state)
{
    (void)state;
    static const kent_restraint_choice asked[] = {KENT_THRUST_BLOCK, KENT_ANCHOR_BLOCK,
                                                  KENT_BLOCK_AND_JOINTS};
    for (size_t i = 0; i < 3; i++) {
        kent_build b = main_with(KENT_BLOCKS_FORBIDDEN, asked[i], 0.5, false);
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_e(&b, r);
        assert_int_equal(h->chosen, KENT_RESTRAINED_JOINTS);
        assert_int_equal(h->block.type, KENT_BLOCK_NONE);
        assert_true(h->held && h->restrained_length > 0.0);
        assert_within(r->concrete, 0.0, 0.0);
        kent_hand_expect(h,
                         "the rules 'town' let no block be built: restrained joints");
        finish(&b, r);
    }
    kent_build b = main_with(KENT_BLOCKS_ALLOWED, KENT_THRUST_BLOCK, NAN, false);
    kent_restraints *r = sized(&b);
    assert_int_equal(at_e(&b, r)->chosen, KENT_THRUST_BLOCK);
    assert_int_equal(at_e(&b, r)->block.type, KENT_BLOCK_BEARING);
    finish(&b, r);
}

static void joints_that_cannot_stand_in_are_not_said_to_hold(void **state)
{
    (void)state;
    kent_build b = main_with(KENT_BLOCKS_FORBIDDEN, KENT_THRUST_BLOCK, NAN, false);
    b.model->soils[0].friction_ratio = (double)NAN;
    kent_restraints *r = sized(&b);
    const kent_holding *h = at_e(&b, r);
    assert_false(h->held);
    kent_hand_expect(h, "lacks friction_ratio; give it in soils");
    assert_false(kent_hand_says(h, "write restraint = \"thrust-block\""));
    finish(&b, r);
}

static void a_new_main_alone_gets_no_block_where_only_old_ones_may(void **state)
{
    (void)state;
    for (int old = 0; old < 2; old++) {
        kent_build b =
            main_with(KENT_BLOCKS_ON_OLD_MAINS, KENT_THRUST_BLOCK, NAN, false);
        if (old) {
            b.model->notes[0].role = KENT_ROLE_TAPPING;
            b.model->notes[0].branch = (kent_branch){
                KENT_BRANCH_BLANK, {0.0, 1.0, 0.0}, 0.2, 0.2, KENT_PUSH_ON};
        }
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_e(&b, r);
        assert_int_equal(h->chosen, old ? KENT_THRUST_BLOCK : KENT_RESTRAINED_JOINTS);
        assert_true(kent_hand_says(h, "mains that lay before only") == (old == 0));
        finish(&b, r);
    }
}

/* By hand for the block: all of F, not a share. */
static void rules_that_want_both_have_each_for_all_of_the_thrust(void **state)
{
    (void)state;
    kent_build b = main_with(KENT_BLOCKS_ALLOWED, KENT_RESTRAINED_JOINTS, NAN, false);
    kent_restraints *r = sized(&b);
    const double alone = at_e(&b, r)->restrained_length;
    finish(&b, r);

    for (int stated = 0; stated < 2; stated++) {
        b = main_with(KENT_BLOCKS_WITH_JOINTS,
                      stated ? KENT_BLOCK_AND_JOINTS : KENT_THRUST_BLOCK,
                      stated ? 0.4 : (double)NAN, false);
        r = sized(&b);
        const kent_holding *h = at_e(&b, r);
        assert_int_equal(h->chosen, KENT_BLOCK_AND_JOINTS);
        assert_close(h->block.bearing_area, factored() / 150e3, 1e-9);
        assert_close(h->restrained_length, alone, 1e-12);
        assert_true(h->held);
        kent_hand_expect(h, stated ? "block_share, 0.4, is not used"
                                   : "restrained joints with every block");
        assert_false(kent_hand_says(h, "act together"));
        finish(&b, r);
    }
}

/* Upright bends. */
static void against_an_upward_thrust_blocks_may_be_forbidden_alone(void **state)
{
    (void)state;
    for (int crest = 0; crest < 2; crest++) {
        for (int any = 0; any < 2; any++) {
            kent_build b =
                main_with(any ? KENT_BLOCKS_WITH_JOINTS : KENT_BLOCKS_ALLOWED,
                          KENT_THRUST_BLOCK, NAN, crest == 1);
            b.model->rules.vertical_blocks = KENT_BLOCKS_FORBIDDEN;
            kent_restraints *r = sized(&b);
            const kent_holding *h = at_e(&b, r);
            assert_int_equal(h->chosen, crest ? KENT_RESTRAINED_JOINTS
                                        : any ? KENT_BLOCK_AND_JOINTS
                                              : KENT_THRUST_BLOCK);
            assert_true(kent_hand_says(h, "against an upward thrust") == (crest == 1));
            finish(&b, r);
        }
    }
}

/* ---- shares ---------------------------------------------------------------------- */

/* A length behind an end goes with the force: 0.6 of the thrust, 0.6 of the length. */
static void block_and_joints_are_each_for_their_part(void **state)
{
    (void)state;
    kent_build b = main_with(KENT_BLOCKS_ALLOWED, KENT_RESTRAINED_JOINTS, NAN, false);
    kent_restraints *r = sized(&b);
    const double alone = at_e(&b, r)->restrained_length;
    finish(&b, r);

    for (int reason = 0; reason < 2; reason++) {
        b = main_with(KENT_BLOCKS_ALLOWED, KENT_BLOCK_AND_JOINTS, 0.4, false);
        if (reason) {
            (void)snprintf(b.model->notes[0].stated.reason,
                           sizeof b.model->notes[0].stated.reason,
                           "the pit is too narrow");
        }
        r = sized(&b);
        const kent_holding *h = at_e(&b, r);
        assert_true(h->held);
        assert_close(h->block_share, 0.4, 0.0);
        assert_close(h->joints_share, 0.6, 1e-12);
        assert_close(h->block.bearing_area, 0.4 * factored() / 150e3, 1e-9);
        assert_close(h->restrained_length, 0.6 * alone, 1e-9);
        kent_hand_expect(h, "the block is for 40 % of the thrust, the joints for 60 %");
        assert_true(kent_hand_says(h, "no reason is given") == (reason == 0));
        assert_non_null(kent_derivation_find(&h->derivation, "bs"));
        finish(&b, r);
    }
}

/* The next case's load stands beside a share, so it is its share. */
static void of_the_next_case_too_the_block_takes_its_part(void **state)
{
    (void)state;
    static const kent_hand_case two[] = {{"test", KENT_CASE_TEST, 1.5, 0.2e6},
                                         {"rest", KENT_CASE_STATIC, 1.5, 0.15e6}};
    kent_build b = main_with(KENT_BLOCKS_ALLOWED, KENT_BLOCK_AND_JOINTS, 0.4, false);
    b.model->pipes[0].laying_length = 100.0; /* so that the block uses most */
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, two, 2);
    const kent_line *block = kent_derivation_find(&at_e(&b, r)->derivation, "Fh");
    const kent_line *next = kent_derivation_find(&at_e(&b, r)->derivation, "Fnext");

    assert_true(block && next);
    assert_close(next->value, 0.75 * block->value, 1e-9);
    finish(&b, r);
}

static void without_a_share_or_with_one_part_missing_nothing_is_held(void **state)
{
    (void)state;
    kent_build b = main_with(KENT_BLOCKS_ALLOWED, KENT_BLOCK_AND_JOINTS, NAN, false);
    kent_restraints *r = sized(&b);
    assert_false(at_e(&b, r)->held);
    kent_hand_expect(at_e(&b, r), "give block_share");
    finish(&b, r);

    b = main_with(KENT_BLOCKS_ALLOWED, KENT_BLOCK_AND_JOINTS, 0.4, false);
    b.model->soils[0].friction_ratio = (double)NAN;
    r = sized(&b);
    assert_false(at_e(&b, r)->held);
    assert_int_equal(at_e(&b, r)->block.type, KENT_BLOCK_NONE);
    kent_hand_expect(at_e(&b, r), "lacks friction_ratio");
    finish(&b, r);

    b = main_with(KENT_BLOCKS_ALLOWED, KENT_BLOCK_AND_JOINTS, 0.4, false);
    b.model->ground.cover = 0.5;
    r = sized(&b);
    assert_false(at_e(&b, r)->held);
    assert_true(at_e(&b, r)->leg_count == 1);
    kent_hand_expect(at_e(&b, r), "is less than the least");
    finish(&b, r);
}

/* ---- limits of the rules --------------------------------------------------------- */

static void a_large_main_wants_its_own_least_cover(void **state)
{
    (void)state;
    for (int large = 0; large < 2; large++) {
        kent_build b = main_with(KENT_BLOCKS_ALLOWED, KENT_THRUST_BLOCK, NAN, false);
        b.model->rules.large_diameter = large ? 0.62 : 0.63;
        b.model->rules.large_least_cover = 1.6;
        kent_restraints *r = sized(&b);
        assert_true(at_e(&b, r)->held == (large == 0));
        assert_true(kent_hand_says(at_e(&b, r), "the least, 1.60 m") == (large == 1));
        finish(&b, r);
    }
}

static void beyond_the_rules_largest_thrust_the_concrete_is_to_be_designed(void **state)
{
    (void)state;
    for (int pass = 0; pass < 2; pass++) {
        kent_build b = main_with(KENT_BLOCKS_ALLOWED, KENT_THRUST_BLOCK, NAN, false);
        b.model->rules.largest_thrust = factored() * (pass ? 0.99 : 1.01);
        kent_restraints *r = sized(&b);
        assert_true(kent_hand_says(at_e(&b, r), "concrete itself must be designed") ==
                    (pass == 1));
        finish(&b, r);
    }
}

/* 0.62 m and 0.3 m more, in steps of 0.05 m; beyond 2/3 of 1.81 m nothing fits.
 */
static void a_face_is_taller_than_its_pipe_by_what_the_rules_ask(void **state)
{
    (void)state;
    static const double over[] = {0.0, 0.3, 0.57, 0.6};
    static const double least[] = {0.0, 0.92, 1.19, 0.0};
    for (int i = 0; i < 4; i++) {
        kent_build b = main_with(KENT_BLOCKS_ALLOWED, KENT_THRUST_BLOCK, NAN, false);
        b.model->rules.height_over_diameter = over[i];
        kent_restraints *r = sized(&b);
        assert_true(at_e(&b, r)->held == (i < 3));
        if (i < 3) assert_true(at_e(&b, r)->block.height >= least[i]);
        if (i == 0) assert_true(at_e(&b, r)->block.height < 0.92);
        finish(&b, r);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(where_blocks_are_forbidden_joints_take_their_place),
        cmocka_unit_test(joints_that_cannot_stand_in_are_not_said_to_hold),
        cmocka_unit_test(a_new_main_alone_gets_no_block_where_only_old_ones_may),
        cmocka_unit_test(rules_that_want_both_have_each_for_all_of_the_thrust),
        cmocka_unit_test(against_an_upward_thrust_blocks_may_be_forbidden_alone),
        cmocka_unit_test(block_and_joints_are_each_for_their_part),
        cmocka_unit_test(of_the_next_case_too_the_block_takes_its_part),
        cmocka_unit_test(without_a_share_or_with_one_part_missing_nothing_is_held),
        cmocka_unit_test(a_face_is_taller_than_its_pipe_by_what_the_rules_ask),
        cmocka_unit_test(a_large_main_wants_its_own_least_cover),
        cmocka_unit_test(
            beyond_the_rules_largest_thrust_the_concrete_is_to_be_designed),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
