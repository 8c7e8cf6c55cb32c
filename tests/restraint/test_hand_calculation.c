/* Every line of every hand calculation, worked out again from the digits it prints. */
#include "kent_hand.h"

#include <math.h>
#include <string.h>

static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

static const kent_hand_case CASES[] = {{"test", KENT_CASE_TEST, 1.2, 1.2e6},
                                       {"static", KENT_CASE_STATIC, 1.5, 0.8e6},
                                       {"shut", KENT_CASE_OCCASIONAL, 1.5, 1.0e6}};

/* A main with one of everything that is held: a crest at B, a plan bend at C, a turn in
 * plan and profile at D, a sag at F, a tee at T with a branch to S, a reducer at G, a
 * dead end at E. Cover 1.6 m. */
static kent_build main_of_everything(void)
{
    kent_build b = kent_build_new();

    (void)kent_build_point(&b, "A", 0.0, 0.0, 40.0);
    (void)kent_build_point(&b, "B", 150.0, 0.0, 60.0);
    (void)kent_build_point(&b, "C", 300.0, 0.0, 60.0);
    (void)kent_build_point(&b, "D", 440.0, 50.0, 60.0);
    (void)kent_build_point(&b, "F", 560.0, 170.0, 40.0);
    (void)kent_build_point(&b, "T", 700.0, 310.0, 40.0);
    (void)kent_build_point(&b, "S", 760.0, 250.0, 40.0);
    (void)kent_build_point(&b, "G", 800.0, 410.0, 40.0);
    (void)kent_build_point(&b, "E", 900.0, 510.0, 40.0);
    const int p = kent_build_pipe(&b, "P", "A B C D F T G", 0.5, 1000.0);
    (void)kent_build_pipe(&b, "Q", "T S", 0.2, 1000.0);
    (void)kent_build_pipe(&b, "R", "G E", 0.3, 1000.0);
    b.model->pipes[p].laying_length = 5.5;
    b.model->pipes[2].unit_mass = 78.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_scenario(&b, "shut", 60.0);
    b.model->loads.test_pressure = 1.2e6;
    const int t = kent_build_soil(&b, "till", 180e3, 19e3, 1.6);
    kent_soil *till = &b.model->soils[t];
    till->factor_inside = 1.5;
    till->vertical_bearing = 120e3;
    till->friction_angle = 28.0 * DEGREE;
    till->cohesion = 4e3;
    till->friction_ratio = 0.7;
    till->adhesion_ratio = 0.5;
    till->passive_ratio = 0.6;
    b.model->ground.water_table = (double)INFINITY;
    return b;
}

static void check_all(kent_build *b, size_t least)
{
    kent_build_derive(b);
    kent_restraints *r = kent_hand_size(b, CASES, 3);
    size_t checked = 0;

    for (size_t i = 0; i < r->fitting_count; i++) {
        const kent_derivation *d = &r->fittings[i].derivation;
        checked += kent_hand_lines(d, KENT_SI);
        checked += kent_hand_lines(d, KENT_US);
    }
    assert_true(checked >= least);
    kent_restraints_free(r);
    kent_build_clear(b);
}

static void every_printed_line_follows_from_the_digits_above_it(void **state)
{
    (void)state;
    kent_build b = main_of_everything();
    check_all(&b, 300);
}

static void so_it_does_in_ground_water_and_in_sleeves(void **state)
{
    (void)state;
    kent_build b = main_of_everything();
    b.model->ground.water_table = 0.7;
    b.model->ground.wrapped = true;
    check_all(&b, 300);
}

/* A steep crest under little cover: the block is as tall as the ground lets it be. */
static void so_it_does_under_little_cover(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", 0.0, 0.0, 40.0);
    (void)kent_build_point(&b, "B", 200.0, 0.0, 120.0);
    (void)kent_build_point(&b, "C", 400.0, 0.0, 40.0);
    (void)kent_build_pipe(&b, "P", "A B C", 0.6, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_scenario(&b, "shut", 60.0);
    (void)kent_build_soil(&b, "till", 180e3, 19e3, 0.7);
    b.model->loads.test_pressure = 1.2e6;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, CASES, 3);
    const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];

    assert_non_null(kent_derivation_find(&h->derivation, "top"));
    assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 20);
    assert_true(kent_hand_lines(&h->derivation, KENT_US) > 20);
    kent_restraints_free(r);
    kent_build_clear(&b);
}

static void so_it_does_in_inches(void **state)
{
    (void)state;
    kent_build b = main_of_everything();
    b.model->units = KENT_US;
    b.model->rules.side_step = 0.0508;
    b.model->rules.least_thickness = 0.3048;
    b.model->rules.least_height = 0.3048;
    check_all(&b, 300);
}

static void so_it_does_with_restrained_joints(void **state)
{
    (void)state;
    static const char *const AT[] = {"B", "C", "D", "F", "T", "G", "E"};
    kent_build b = main_of_everything();

    for (size_t i = 0; i < sizeof AT / sizeof AT[0]; i++) {
        const int note = kent_build_note(&b, AT[i]);
        b.model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
    }
    check_all(&b, 300);
}

/* A crest that suction pulls down and a sag that it lifts: both get both checks. */
static void so_it_does_where_a_fitting_is_pushed_up_and_pulled_down(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {
        {"test", KENT_CASE_TEST, 1.5, 0.6e6},
        {"shut", KENT_CASE_OCCASIONAL, 1.5, -0.09e6}};
    kent_build b = main_of_everything();
    b.model->loads.test_pressure = 0.6e6;
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, cases, 2);
    const kent_holding *crest = &r->fittings[kent_build_fitting_of(&b, "B")];
    const kent_holding *sag = &r->fittings[kent_build_fitting_of(&b, "F")];

    assert_int_equal(crest->block.type, KENT_BLOCK_GRAVITY);
    assert_int_equal(sag->block.type, KENT_BLOCK_BASE);
    assert_int_equal(crest->by_sense[KENT_DOWNWARD], 1);
    assert_int_equal(sag->by_sense[KENT_UPWARD], 1);
    assert_true(kent_hand_lines(&crest->derivation, KENT_SI) > 20);
    assert_true(kent_hand_lines(&sag->derivation, KENT_SI) > 20);
    kent_restraints_free(r);
    kent_build_clear(&b);
}

/* The tee and the reducer on a slight slope: face, weight and footing of one block. */
static void so_it_does_where_one_block_does_for_all(void **state)
{
    (void)state;
    for (int way = -1; way <= 1; way += 2) {
        kent_build b = main_of_everything();
        b.model->points[6].at.z -= way * 2.0; /* the branch falls, or climbs */
        b.model->points[8].at.z -= way * 6.0; /* so does the end */
        kent_build_derive(&b);
        kent_restraints *r = kent_hand_size(&b, CASES, 3);
        const kent_holding *reducer = &r->fittings[kent_build_fitting_of(&b, "G")];
        const kent_holding *tee = &r->fittings[kent_build_fitting_of(&b, "T")];
        assert_int_equal(reducer->block.type, KENT_BLOCK_BEARING);
        assert_int_equal(tee->block.type, KENT_BLOCK_BEARING);
        const kent_line *vertical = kent_derivation_find(
            &reducer->derivation, reducer->by_sense[KENT_UPWARD] >= 0 ? "Vc" : "qv");
        assert_non_null(vertical);
        assert_true(kent_hand_lines(&reducer->derivation, KENT_SI) > 20);
        assert_true(kent_hand_lines(&tee->derivation, KENT_US) > 20);
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
}

static void the_calculation_names_the_case_and_the_runner_up(void **state)
{
    (void)state;
    kent_build b = main_of_everything();
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, CASES, 3);
    const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "C")];
    const kent_line *next = kent_derivation_find(&h->derivation, "Fnext");

    assert_int_equal(h->governing, 2); /* 1.5 x 1.0 beats 1.2 x 1.2 */
    assert_non_null(next);
    assert_non_null(strstr(next->says, "'test'"));
    assert_close(next->value, h->runner_up_load, 1e-15);
    kent_restraints_free(r);
    kent_build_clear(&b);
}

/* Governed by a surge whose changing flow stands in the sum, and by the peak on one
 * side of a shut valve, of which nobody knows how long it lasts. */
static void changing_flow_is_taken_off_and_no_line_is_without_a_number(void **state)
{
    (void)state;
    kent_build b = main_of_everything();
    kent_build_derive(&b);
    kent_loads_result loads = kent_hand_loads(b.model, CASES, 3);
    kent_restraints *r = NULL;
    kent_error err = {0};
    for (size_t i = 0; i < loads.fitting_count; i++) {
        kent_load_case *shut = &loads.fittings[i].cases[2];
        shut->above_90_percent = (double)NAN;
        for (int k = 0; k < KENT_SENSES; k++) {
            kent_balance *moved = &shut->worst[k].balance;
            moved->unsteady = (kent_vec3){900.0, -800.0, 700.0};
            moved->thrust = kent_vec3_add(moved->thrust, moved->unsteady);
        }
    }
    assert_int_equal(kent_restraint_size(b.model, &loads, &r, &err), KENT_OK);
    for (size_t i = 0; i < r->fitting_count; i++) {
        const kent_derivation *d = &r->fittings[i].derivation;
        for (size_t k = 0; k < d->count; k++) {
            if (d->lines[k].symbol[0] == '\0') continue; /* a heading */
            assert_true(isfinite(d->lines[k].value));
        }
        for (const char *s = "T_h\0T_up\0T_dn\0"; *s != '\0'; s += strlen(s) + 1) {
            const kent_line *part = kent_derivation_find(d, s);
            if (!part || part->formula[0] == '\0') continue;
            assert_non_null(strstr(part->formula, "-U_"));
        }
    }
    kent_hand_clear(&loads);
    kent_restraints_free(r);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_printed_line_follows_from_the_digits_above_it),
        cmocka_unit_test(so_it_does_in_ground_water_and_in_sleeves),
        cmocka_unit_test(so_it_does_under_little_cover),
        cmocka_unit_test(so_it_does_in_inches),
        cmocka_unit_test(so_it_does_with_restrained_joints),
        cmocka_unit_test(so_it_does_where_a_fitting_is_pushed_up_and_pulled_down),
        cmocka_unit_test(so_it_does_where_one_block_does_for_all),
        cmocka_unit_test(the_calculation_names_the_case_and_the_runner_up),
        cmocka_unit_test(changing_flow_is_taken_off_and_no_line_is_without_a_number),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
