/* On which diameter the pressure acts, and what else the load cases ask to be said. */
#include "kent_hand.h"
#include "kent_net.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double PSI = 6894.757, INCH = 0.0254, POUND = 4.448222;

static double area(double diameter) { return 0.25 * PI * diameter * diameter; }

/* R (level 100 m) - M - E, iron pipe of a nominal size (in) and outside diameter. */
static kent_build a_main(double nominal, double outside)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    (void)kent_build_point(&b, "M", 100.0, 0.0, 0.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    const int p = kent_build_pipe(&b, "A", "R M E", nominal * INCH, 1000.0);
    b.model->pipes[p].nominal_size = nominal * INCH;
    b.model->pipes[p].outside_diameter = outside * INCH;
    (void)kent_build_fixed_level(&b, "R", 100.0);
    (void)kent_build_soil(&b, "sand", 150e3, 18e3, 2.0);
    return b;
}

static const kent_holding *sized(kent_net *n, const char *id, kent_restraints **out)
{
    kent_error err = {0};
    *out = NULL;
    kent_net_finish(n);
    if (kent_restraint_size(n->model, n->loads, out, &err)) fail_msg("%s", err.what);
    return &(*out)->fittings[kent_build_fitting_of(&n->build, id)];
}

/* Dead ends of iron pipe under 250 psi on the outside diameter (AWWA C151), in pounds,
 * and what a state DOT's drawing prints for the same pipe: 49 % too little of 4 in, 25
 * % of 12 in. */
static void the_outside_diameter_is_taken_unless_asked(void **state)
{
    (void)state;
    static const struct {
        double nominal, outside, on_outside, printed, more; /* in, in, lb, lb, % */
    } ROWS[] = {{4, 4.80, 4524, 3035, 49.1},
                {6, 6.90, 9348, 6860, 36.3},
                {8, 9.05, 16082, 12185, 32.0},
                {12, 13.20, 34212, 27405, 24.8}};
    for (size_t k = 0; k < sizeof ROWS / sizeof ROWS[0]; k++) {
        kent_build b = a_main(ROWS[k].nominal, ROWS[k].outside);
        b.model->loads.test_pressure = 250.0 * PSI;
        b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
        kent_net n = kent_net_of(b);
        kent_net_finish(&n);
        const double thrust = kent_vec3_length(
            kent_net_case(&n, "E", "test")->worst[KENT_RESULTANT].balance.thrust);
        assert_within(thrust / POUND, ROWS[k].on_outside, 1.0);
        assert_within(100.0 * (thrust / POUND / ROWS[k].printed - 1.0), ROWS[k].more,
                      0.05);
        kent_net_clear(&n);
    }
}

/* By key alone, flagged, with what the outside diameter would add: (4.8/4)^2 is 44 %
 * more. */
static void another_area_is_a_choice_that_is_told(void **state)
{
    (void)state;
    static const kent_thrust_area AREAS[] = {KENT_AREA_OUTSIDE, KENT_AREA_INSIDE,
                                             KENT_AREA_NOMINAL};
    static const char *const WORDS[] = {NULL, "taken on the bore",
                                        "on the nominal size"};
    for (size_t k = 0; k < 3; k++) {
        kent_build b = a_main(4.0, 4.8);
        b.model->pipes[0].inside_diameter = 4.1 * INCH;
        b.model->loads.thrust_area = AREAS[k];
        kent_net n = kent_net_of(b);
        kent_restraints *r;
        const kent_holding *h = sized(&n, "E", &r);
        const double d[] = {4.8, 4.1, 4.0};
        const double thrust = kent_vec3_length(
            kent_net_case(&n, "E", "static")->worst[KENT_RESULTANT].balance.thrust);
        assert_close(thrust, 1000.0 * 9.80665 * 100.0 * area(d[k] * INCH), 1e-9);
        assert_true(kent_hand_says(h, "as thrust_area says") == (k > 0));
        if (k > 0) {
            char more[64];
            const double ratio = 4.8 / d[k];
            (void)snprintf(more, sizeof more, "with up to %.0f %% more",
                           100.0 * (ratio * ratio - 1.0));
            kent_hand_expect(h, WORDS[k]);
            kent_hand_expect(h, more);
        }
        const kent_line *share = kent_derivation_find(&h->derivation, "more_1");
        assert_true(share != NULL);
        if (share) assert_close(share->value, 4.8 * 4.8 / 4.1 / 4.1 - 1.0, 1e-9);
        kent_restraints_free(r);
        kent_net_clear(&n);
    }
}

/* Without a nominal size the outside stays; a welded pipe is not pressed on its outside
 * whatever is asked. */
static void an_area_that_is_not_known_is_not_taken(void **state)
{
    (void)state;
    kent_build b = a_main(4.0, 4.8);
    b.model->pipes[0].nominal_size = (double)NAN;
    b.model->loads.thrust_area = KENT_AREA_NOMINAL;
    kent_net n = kent_net_of(b);
    const kent_fitting *f = kent_net_fitting(&n, "E");
    assert_true(n.model->ports[f->port_first].seal_diameter == 4.8 * INCH);
    kent_net_clear(&n);
    b = a_main(4.0, 4.8);
    b.model->pipes[0].joint = KENT_WELDED;
    b.model->loads.thrust_area = KENT_AREA_NOMINAL;
    n = kent_net_of(b);
    f = kent_net_fitting(&n, "E");
    assert_true(n.model->ports[f->port_first].seal_diameter == 4.0 * INCH);
    kent_net_clear(&n);
}

static void a_block_behind_a_cap_goes_with_the_cap(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_main(8.0, 9.05));
    kent_restraints *r;
    const kent_holding *h = sized(&n, "E", &r);
    assert_true(h->held);
    kent_hand_expect(h, "once this end is opened to lead the main on");
    kent_restraints_free(r);
    kent_net_clear(&n);
}

/* Straight pieces have no thrust; what they pass on, or cannot, is p A: 100 m of water
 * on 9.05 in, 40.7 kN. */
static void straight_pieces_are_listed_with_their_pull(void **state)
{
    (void)state;
    static const kent_role ROLES[] = {KENT_ROLE_WALL, KENT_ROLE_FLANGE_ADAPTOR};
    static const char *const WORDS[] = {
        "the structure must hold the main against 40.7 kN",
        "it takes no pull: 40.7 kN opens it"};
    for (size_t k = 0; k < 2; k++) {
        kent_build b = a_main(8.0, 9.05);
        const int note = kent_build_note(&b, "M");
        b.model->notes[note].role = ROLES[k];
        kent_net n = kent_net_of(b);
        kent_restraints *r;
        const kent_holding *h = sized(&n, "M", &r);
        assert_int_equal(kent_net_fitting(&n, "M")->type, KENT_STRAIGHT);
        assert_true(h->needs_nothing);
        kent_hand_expect(h, WORDS[k]);
        kent_hand_expect(h, "no block is needed");
        assert_false(kent_hand_says(h, "nothing is needed"));
        kent_restraints_free(r);
        kent_net_clear(&n);
    }
}

/* A manhole's tee is pushed by its cover alone, once that joint can slip. */
static void a_manhole_tee_is_listed(void **state)
{
    (void)state;
    kent_build b = a_main(24.0, 25.8);
    const int note = kent_build_note(&b, "M");
    b.model->notes[note].role = KENT_ROLE_MANHOLE;
    b.model->notes[note].branch = (kent_branch){.end = KENT_BRANCH_BLANK,
                                                .direction = {0.0, 0.0, 1.0},
                                                .outside_diameter = 0.635,
                                                .inside_diameter = 0.6,
                                                .joint = KENT_FLANGED};
    kent_net n = kent_net_of(b);
    kent_restraints *r;
    (void)sized(&n, "M", &r);
    const kent_fitting *f = kent_net_fitting(&n, "M");
    assert_int_equal(f->type, KENT_TEE);
    assert_int_equal(f->role, KENT_ROLE_MANHOLE);
    const kent_vec3 t =
        kent_net_case(&n, "M", "branch extended")->worst[KENT_RESULTANT].balance.thrust;
    assert_close(t.z, -1000.0 * 9.80665 * 100.0 * area(0.635), 1e-9);
    kent_restraints_free(r);
    kent_net_clear(&n);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_outside_diameter_is_taken_unless_asked),
        cmocka_unit_test(another_area_is_a_choice_that_is_told),
        cmocka_unit_test(an_area_that_is_not_known_is_not_taken),
        cmocka_unit_test(a_block_behind_a_cap_goes_with_the_cap),
        cmocka_unit_test(straight_pieces_are_listed_with_their_pull),
        cmocka_unit_test(a_manhole_tee_is_listed),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
