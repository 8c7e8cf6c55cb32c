/* Fittings on supports and in casings: no soil bears there. */
#include "kent_hand.h"

#include <math.h>

/* R - B - E, a right angle (or a curve of that radius) in good soil, with a block. */
static kent_build turned(double radius)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    const int at = kent_build_point(&b, "B", 500.0, 0.0, 0.0);
    (void)kent_build_point(&b, "E", 500.0, 500.0, 0.0);
    b.model->points[at].curve_radius = radius;
    (void)kent_build_pipe(&b, "A", "R B E", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 80.0);
    (void)kent_build_soil(&b, "sand", 200e3, 19e3, 2.0);
    return b;
}

static const kent_hand_case AT_REST = {"static", KENT_CASE_STATIC, 1.5, 8e5};

static void no_block_stands_where_no_soil_bears(void **state)
{
    (void)state;
    for (int above = 0; above < 2; above++) {
        kent_build b = turned(NAN);
        b.model->pipes[0].above_ground = above;
        kent_build_derive(&b);
        kent_restraints *r = kent_hand_size(&b, &AT_REST, 1);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
        assert_int_equal(h->held, !above);
        assert_int_equal(h->block.type == KENT_BLOCK_NONE, above);
        if (above) kent_hand_expect(h, "hold it by a structure made for");
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
}

static void nor_does_any_hold_a_curve(void **state)
{
    (void)state;
    for (int above = 0; above < 2; above++) {
        kent_build b = turned(200.0);
        b.model->pipes[0].above_ground = above;
        kent_build_derive(&b);
        kent_restraints *r = kent_hand_size(&b, &AT_REST, 1);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
        assert_int_equal(h->held, !above);
        if (above) kent_hand_expect(h, "above ground no soil is beside it");
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
}

/* A casing along part of the pipe, m from R. */
static void encase(kent_build *b, double from, double to)
{
    b->model->ground_zones = kent_alloc(1, sizeof *b->model->ground_zones);
    assert_non_null(b->model->ground_zones);
    b->model->ground_zones[0] = (kent_ground_zone){.from = from,
                                                   .to = to,
                                                   .soil = -1,
                                                   .cover = NAN,
                                                   .water_table = NAN,
                                                   .trench = -1,
                                                   .backfill = -1,
                                                   .casing = true};
    b->model->ground_zone_count = 1;
}

static void nor_does_a_block_stand_in_a_casing(void **state)
{
    (void)state;
    for (int past = 0; past < 2; past++) {
        kent_build b = turned(NAN);
        encase(&b, 490.0, past ? 510.0 : 495.0);
        kent_build_derive(&b);
        kent_restraints *r = kent_hand_size(&b, &AT_REST, 1);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
        assert_int_equal(h->held, !past);
        assert_int_equal(h->block.type == KENT_BLOCK_NONE, past);
        if (past) kent_hand_expect(h, "this stands in a casing");
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
}

static void a_curve_in_a_casing_leans_on_nothing(void **state)
{
    (void)state;
    for (int cased = 0; cased < 2; cased++) {
        kent_build b = turned(200.0);
        if (cased) encase(&b, 300.0, 620.0); /* the whole arc */
        kent_build_derive(&b);
        kent_restraints *r = kent_hand_size(&b, &AT_REST, 1);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
        assert_int_equal(h->held, !cased);
        if (cased) kent_hand_expect(h, "in a casing no soil is beside it");
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(no_block_stands_where_no_soil_bears),
        cmocka_unit_test(nor_does_any_hold_a_curve),
        cmocka_unit_test(nor_does_a_block_stand_in_a_casing),
        cmocka_unit_test(a_curve_in_a_casing_leans_on_nothing),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
