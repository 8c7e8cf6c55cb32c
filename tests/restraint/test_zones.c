/* Restrained lengths through changing ground: zones, trenches, where sound ground is.
 */
#include "kent_hand.h"

#include <string.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

enum { ZONES = 24, TILL = 0, CLAY = 1, PEAT = 2 };

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6}};

static void full_soil(kent_soil *s, double phi, double cohesion)
{
    s->friction_angle = phi * DEGREE;
    s->cohesion = cohesion;
    s->friction_ratio = 0.75;
    s->adhesion_ratio = 0.5;
    s->passive_ratio = 0.6;
}

/* A to C to E, 200 m each, 620 mm outside, wall 10 mm; at C it turns left
 * by 22.5 degrees and has restrained joints. Cover 1.5 m, till all along. */
static kent_build main_of_zones(void)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "E", 200.0 * cos(22.5 * DEGREE),
                           200.0 * sin(22.5 * DEGREE), 50.0);
    const int p = kent_build_pipe(&b, "P", "A C E", 0.6, 1000.0);
    b.model->pipes[p].material_density = 7050.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "E", 0.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    (void)kent_build_soil(&b, "clay", 90e3, 17e3, 1.5);
    (void)kent_build_soil(&b, "peat", 0.0, 12e3, 1.5);
    full_soil(&b.model->soils[TILL], 30.0, 0.0);
    full_soil(&b.model->soils[CLAY], 18.0, 8e3);
    b.model->soils[PEAT].unreliable = true;
    b.model->ground.soil = TILL;
    b.model->ground.water_table = (double)INFINITY;
    b.model->loads.test_pressure = 1.0e6;
    const int note = kent_build_note(&b, "C");
    b.model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
    return b;
}

static kent_ground_zone *zoned(kent_build *b, double from, double to, int soil)
{
    kent_model *m = b->model;
    if (!m->ground_zones) {
        m->ground_zones = kent_alloc(ZONES, sizeof *m->ground_zones);
        assert_non_null(m->ground_zones);
    }
    assert_true(m->ground_zone_count < ZONES);
    kent_ground_zone *zone = &m->ground_zones[m->ground_zone_count++];
    *zone = (kent_ground_zone){.from = from,
                               .to = to,
                               .soil = soil,
                               .cover = (double)NAN,
                               .water_table = (double)NAN,
                               .trench = -1,
                               .backfill = -1};
    return zone;
}

static kent_restraints *sized(kent_build *b)
{
    kent_build_derive(b);
    return kent_hand_size(b, TEST, 1);
}

static const kent_holding *at_c(const kent_build *b, const kent_restraints *r)
{
    return &r->fittings[kent_build_fitting_of(b, "C")];
}

static void finish(kent_build *b, kent_restraints *r)
{
    kent_restraints_free(r);
    kent_build_clear(b);
}

/* N/m that a metre of this pipe holds in a soil under a cover, by the published form.
 */
static double holds(const kent_build *b, int soil, double cover, double passive_ratio)
{
    const kent_soil *s = &b->model->soils[soil];
    const kent_trench t = {.outside_diameter = 0.62,
                           .cover = cover,
                           .pipe_weight = PI * 0.61 * 0.01 * 7050.0 * 9.80665,
                           .water_weight = 1000.0 * 9.80665 * 0.25 * PI * 0.36,
                           .unit_weight = s->unit_weight,
                           .friction_angle = s->friction_angle,
                           .cohesion = s->cohesion,
                           .friction_ratio = s->friction_ratio,
                           .adhesion_ratio = s->adhesion_ratio,
                           .passive_ratio = passive_ratio};
    const kent_soil_grip g = kent_soil_grip_of(&t);
    return g.friction + 0.5 * g.bearing;
}

/* SF p A tan(11.25 deg): what each leg must make up. */
static double demand(void)
{
    return 1.5 * 1.0e6 * 0.25 * PI * 0.62 * 0.62 * tan(11.25 * DEGREE);
}

/* ---- lengths --------------------------------------------------------------------- */

static void a_zone_of_the_same_ground_changes_nothing(void **state)
{
    (void)state;
    double length = 0.0;
    for (int zone = 0; zone < 2; zone++) {
        kent_build b = main_of_zones();
        if (zone) (void)zoned(&b, 200.5, 201.0, TILL);
        kent_restraints *r = sized(&b);
        assert_int_equal(at_c(&b, r)->leg_count, 2);
        const double here = at_c(&b, r)->restrained_length;
        if (zone == 0) length = here;
        assert_close(here, demand() / holds(&b, TILL, 1.5, 0.6), 1e-9);
        assert_close(here, length, 1e-9);
        assert_true(here > 1.5);
        finish(&b, r);
    }
}

/* C stands at station 200, on the edge: clay to 201.2, then till: the leg ahead holds
 * r1 1.2 m in clay and the rest in till; the leg back is in till alone. Clay is the
 * weaker. The same seen the other way. */
static void a_leg_is_added_up_over_what_it_passes(void **state)
{
    (void)state;
    for (int back = 0; back < 2; back++) {
        kent_build b = main_of_zones();
        (void)zoned(&b, back ? 198.8 : 200.0, back ? 200.0 : 201.2, CLAY);
        kent_restraints *r = sized(&b);
        const kent_holding *h = at_c(&b, r);
        const double till = holds(&b, TILL, 1.5, 0.6), clay = holds(&b, CLAY, 1.5, 0.6);
        const double through = 1.2 + (demand() - clay * 1.2) / till;
        assert_true(clay < till && through > 1.2);
        assert_int_equal(h->leg_count, 2);
        assert_close(h->legs[back ? 0 : 1].length, through, 1e-9);
        assert_close(h->legs[back ? 1 : 0].length, demand() / till, 1e-9);
        assert_true(h->held);
        finish(&b, r);
    }
}

/* Three parts, in the last of which the cover is less and water stands. */
static void cover_and_water_of_a_zone_count_in_it(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    (void)zoned(&b, 200.4, 200.8, CLAY);
    kent_ground_zone *low = zoned(&b, 200.8, 260.0, TILL);
    low->cover = 0.9;
    kent_restraints *r = sized(&b);
    const double first = holds(&b, TILL, 1.5, 0.6), second = holds(&b, CLAY, 1.5, 0.6);
    const double third = holds(&b, TILL, 0.9, 0.6);
    assert_close(at_c(&b, r)->legs[1].length,
                 0.8 + (demand() - 0.4 * first - 0.4 * second) / third, 1e-9);
    const double dry = at_c(&b, r)->legs[1].length;
    finish(&b, r);

    b = main_of_zones();
    (void)zoned(&b, 200.4, 200.8, CLAY);
    low = zoned(&b, 200.8, 260.0, TILL);
    low->cover = 0.9;
    low->water_table = 0.0;
    r = sized(&b);
    assert_true(at_c(&b, r)->legs[1].length > dry + 0.1);
    finish(&b, r);
}

/* The ground falls from 1.5 m of cover at C to 0.7 m at E, 200 m on, 0.004 m in each
 * metre: 1.4984 m at the edge of the clay, 1.496 m at the end of the clay, and so on to
 * the end of the leg, which is found by trial. */
static void a_part_goes_by_the_least_cover_along_it(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    b.model->points[1].cover = 1.5;
    b.model->points[2].cover = 0.7;
    (void)zoned(&b, 200.4, 201.0, CLAY);
    (void)zoned(&b, 201.0, 300.0, TILL);
    kent_restraints *r = sized(&b);
    const double first = holds(&b, TILL, 1.4984, 0.6),
                 second = holds(&b, CLAY, 1.496, 0.6);
    double length = 1.0;
    for (int i = 0; i < 50; i++) {
        const double third = holds(&b, TILL, 1.5 - 0.004 * length, 0.6);
        length = 1.0 + (demand() - 0.4 * first - 0.6 * second) / third;
    }
    assert_true(length > 1.1);
    assert_close(at_c(&b, r)->legs[1].length, length, 1e-7);
    finish(&b, r);
}

/* A stop D stands 1 m beyond C, where nothing turns; the leg is 1.6 m long in till. */
static kent_build main_with_a_stop(double beyond)
{
    kent_build b = kent_build_new();
    const double cosine = cos(22.5 * DEGREE), sine = sin(22.5 * DEGREE);
    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "D", beyond * cosine, beyond * sine, 50.0);
    (void)kent_build_point(&b, "E", 200.0 * cosine, 200.0 * sine, 50.0);
    const int p = kent_build_pipe(&b, "P", "A C D E", 0.6, 1000.0);
    b.model->pipes[p].material_density = 7050.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "E", 0.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    (void)kent_build_soil(&b, "clay", 90e3, 17e3, 1.5);
    full_soil(&b.model->soils[TILL], 30.0, 0.0);
    full_soil(&b.model->soils[CLAY], 12.0, 2e3);
    (void)kent_build_soil(&b, "peat", 0.0, 12e3, 1.5);
    b.model->soils[PEAT].unreliable = true;
    b.model->ground.soil = TILL;
    b.model->ground.water_table = (double)INFINITY;
    b.model->loads.test_pressure = 1.0e6;
    const int note = kent_build_note(&b, "C");
    b.model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
    return b;
}

/* Cover, soil and water of a stop within the leg count all along it, those of one
 * beyond its end do not, and better ground there is no gain. */
static void a_leg_is_as_weak_as_the_weakest_stop_within_it(void **state)
{
    (void)state;
    enum { COVER, SOIL, WATER, BETTER, KINDS };
    for (int kind = 0; kind < KINDS; kind++) {
        for (int far = 0; far < 2; far++) {
            kent_build b = main_with_a_stop(far ? 50.0 : 1.0);
            kent_point *d = &b.model->points[2];
            const double till = holds(&b, TILL, 1.5, 0.6);
            double there = till;
            if (kind == COVER) d->cover = 0.8;
            if (kind == COVER) there = holds(&b, TILL, 0.8, 0.6);
            if (kind == SOIL) d->soil = CLAY;
            if (kind == SOIL) there = holds(&b, CLAY, 1.5, 0.6);
            if (kind == WATER) d->water_table = 0.0;
            if (kind == BETTER) d->cover = 4.0;
            kent_restraints *r = sized(&b);
            const kent_holding *h = at_c(&b, r);
            const bool weak = kind != BETTER && !far;
            assert_true(there <= till && demand() / till > 1.2);
            assert_close(h->legs[0].length, demand() / till, 1e-9);
            if (weak && kind == WATER) {
                assert_true(h->legs[1].length > 1.3 * h->legs[0].length);
            } else {
                assert_close(h->legs[1].length, demand() / (weak ? there : till), 1e-9);
            }
            assert_true(kent_hand_says(h, "the ground at D is the weakest along") ==
                        weak);
            finish(&b, r);
        }
    }
}

/* In soil lighter than ground water a pipe of plastic floats: W of 11.4 is below nil,
 * and gives no length at all, least of all a negative one that holds. */
static void a_pipe_that_floats_has_no_length(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    b.model->pipes[0].material_density = 900.0;
    b.model->soils[TILL].unit_weight = 9000.0; /* less than water */
    b.model->ground.water_table = 0.0;
    kent_restraints *r = sized(&b);
    const kent_holding *h = at_c(&b, r);
    assert_int_equal(h->leg_count, 0);
    assert_false(h->held);
    kent_hand_expect(h, "makes no friction on the pipe");
    finish(&b, r);
}

/* D stands on the edge of peat, 1 m beyond C: what lies before it is till. */
static void a_stop_on_an_edge_belongs_to_the_ground_beyond(void **state)
{
    (void)state;
    kent_build b = main_with_a_stop(1.0);
    (void)zoned(&b, 201.0, 205.0, PEAT);
    kent_restraints *r = sized(&b);
    assert_close(at_c(&b, r)->legs[1].length,
                 4.0 + demand() / holds(&b, TILL, 1.5, 0.6), 1e-9);
    finish(&b, r);
}

/* In clay without cohesion, lighter than the water that stands in it, the pipe slips.
 */
static void a_part_that_holds_nothing_is_passed_through_and_said(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    b.model->pipes[0].material_density = 900.0;
    b.model->soils[CLAY].unit_weight = 9000.0;
    b.model->soils[CLAY].cohesion = 0.0;
    zoned(&b, 200.5, 203.5, CLAY)->water_table = 0.0;
    kent_restraints *r = sized(&b);
    const kent_holding *h = at_c(&b, r);
    assert_close(h->legs[1].length, 3.0 + h->legs[0].length, 1e-9);
    kent_hand_expect(h, "passes through 3.00 m of clay, which holds nothing");
    finish(&b, r);
}

/* Where nobody states a cover for the site, that of the fitting goes on. */
static void a_leg_keeps_the_cover_of_its_fitting_where_no_other_is_known(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    b.model->ground.cover = (double)NAN;
    b.model->points[1].cover = 1.5;
    kent_restraints *r = sized(&b);
    assert_close(at_c(&b, r)->restrained_length, demand() / holds(&b, TILL, 1.5, 0.6),
                 1e-9);
    finish(&b, r);
}

/* Half the passive resistance counts at a bend: what stands beside the trench is told.
 */
static void what_stands_near_a_restrained_bend_is_told(void **state)
{
    (void)state;
    for (int near = 0; near < 2; near++) {
        kent_build b = main_of_zones();
        b.model->obstacles = kent_alloc(1, sizeof *b.model->obstacles);
        assert_non_null(b.model->obstacles);
        b.model->obstacles[0] = (kent_obstacle){
            .what = "sewer", .distance = 1.0, .depth = 2.0, .direction = {0, -1, 0}};
        b.model->obstacle_count = 1;
        b.model->notes[0].obstacle_count = (size_t)near;
        kent_restraints *r = sized(&b);
        assert_true(at_c(&b, r)->held);
        assert_true(kent_hand_says(at_c(&b, r), "'sewer' stands near") == (near == 1));
        finish(&b, r);
    }
}

static void peat_on_the_way_is_passed_through_and_said(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    (void)zoned(&b, 200.5, 205.5, PEAT);
    kent_restraints *r = sized(&b);
    const kent_holding *h = at_c(&b, r);
    assert_close(h->legs[1].length, 5.0 + h->legs[0].length, 1e-9);
    assert_true(h->legs[1].fits);
    kent_hand_expect(h, "passes through 5.00 m of peat, which holds nothing");
    finish(&b, r);
}

static void peat_to_the_end_of_the_pipe_gives_no_length(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    (void)zoned(&b, 200.5, 400.0, PEAT);
    kent_restraints *r = sized(&b);
    assert_false(at_c(&b, r)->held);
    assert_int_equal(at_c(&b, r)->leg_count, 1); /* the one back */
    kent_hand_expect(at_c(&b, r), "gives no restraint, to the end of the pipe");
    finish(&b, r);
}

static void what_a_soil_on_the_way_lacks_is_named(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    b.model->soils[CLAY].adhesion_ratio = (double)NAN;
    (void)zoned(&b, 200.5, 400.0, CLAY);
    kent_restraints *r = sized(&b);
    kent_hand_expect(at_c(&b, r), "no restrained length: soil 'clay' lacks "
                                  "adhesion_ratio");
    finish(&b, r);
}

static void ground_that_changes_too_often_is_refused(void **state)
{
    (void)state;
    for (int zones = 6; zones <= 7; zones++) {
        kent_build b = main_of_zones();
        for (int i = 0; i < zones; i++) {
            const double from = 200.1 + 0.1 * i;
            (void)zoned(&b, from, from + 0.1, i % 2 == 0 ? PEAT : CLAY);
        }
        kent_restraints *r = sized(&b);
        assert_true(kent_hand_says(at_c(&b, r), "changes more than 7 times") ==
                    (zones == 7));
        finish(&b, r);
    }
}

/* A tee's branch has no zones of its own: it goes on in the ground of the tee, or in
 * that of the site where this holds less, as till holds this small pipe. */
static void a_branch_without_zones_goes_by_the_weaker_of_two_grounds(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    (void)kent_build_point(&b, "S", 0.0, -100.0, 50.0);
    (void)kent_build_pipe(&b, "Q", "C S", 0.2, 1000.0);
    b.model->pipes[1].material_density = 7050.0;
    (void)zoned(&b, 150.0, 250.0, CLAY);
    kent_restraints *r = sized(&b);
    const kent_holding *h = at_c(&b, r);
    assert_int_equal(h->leg_count, 1);
    const double in_zone = h->legs[0].length;
    finish(&b, r);

    b = main_of_zones();
    (void)kent_build_point(&b, "S", 0.0, -100.0, 50.0);
    (void)kent_build_pipe(&b, "Q", "C S", 0.2, 1000.0);
    b.model->pipes[1].material_density = 7050.0;
    r = sized(&b);
    assert_close(at_c(&b, r)->legs[0].length, in_zone, 1e-9);
    finish(&b, r);

    b = main_of_zones();
    (void)kent_build_point(&b, "S", 0.0, -100.0, 50.0);
    (void)kent_build_pipe(&b, "Q", "C S", 0.2, 1000.0);
    b.model->pipes[1].material_density = 7050.0;
    b.model->ground.soil = CLAY;
    r = sized(&b);
    assert_true(at_c(&b, r)->legs[0].length < in_zone - 0.1);
    finish(&b, r);
}

/* ---- trenches -------------------------------------------------------------------- */

static void the_share_of_passive_pressure_goes_by_the_trench(void **state)
{
    (void)state;
    static const struct {
        int trench;
        double ratio;
    } rows[] = {{-1, 0.6}, {0, 0.2}, {3, 0.9}, {1, 0.6}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        kent_build b = main_of_zones();
        b.model->soils[TILL].passive_by_trench[0] = 0.2;
        b.model->soils[TILL].passive_by_trench[3] = 0.9;
        b.model->ground.trench = rows[i].trench;
        kent_restraints *r = sized(&b);
        assert_close(at_c(&b, r)->restrained_length,
                     demand() / holds(&b, TILL, 1.5, rows[i].ratio), 1e-9);
        assert_true(kent_hand_says(at_c(&b, r), "its passive_ratio, 0.6, is taken") ==
                    (rows[i].trench == 1));
        finish(&b, r);
    }
}

/* ---- where sound ground is ------------------------------------------------------- */

/* C in peat from 170 to 212: 30 m back and 12 m on. */
static void in_a_zone_of_peat_it_says_how_far_its_edges_are(void **state)
{
    (void)state;
    kent_build b = main_of_zones();
    b.model->notes[0].restraint = KENT_THRUST_BLOCK;
    (void)zoned(&b, 170.0, 212.0, PEAT);
    kent_restraints *r = sized(&b);
    const kent_holding *h = at_c(&b, r);
    assert_false(h->held);
    kent_hand_expect(h, "30 m towards A into the till at the edge of its zone");
    kent_hand_expect(h, "12 m towards E into the till at the edge of its zone");
    finish(&b, r);
}

/* ---- the hand calculation -------------------------------------------------------- */

static void every_line_over_parts_follows_from_those_above(void **state)
{
    (void)state;
    for (int i = 0; i < 8; i++) {
        kent_build b = main_of_zones();
        (void)zoned(&b, 200.3, 200.6, CLAY);
        (void)zoned(&b, 200.6, 202.6, PEAT);
        kent_ground_zone *last = zoned(&b, 202.6, 300.0, CLAY);
        if (i & 1) last->water_table = 0.5;
        if (i & 2) b.model->ground.wrapped = true;
        if (i & 4) b.model->pipes[0].laying_length = 6.0;
        kent_restraints *r = sized(&b);
        const kent_derivation *d = &at_c(&b, r)->derivation;
        const kent_line *line = kent_derivation_find(d, "L");
        assert_non_null(line);
        assert_string_equal(line->formula,
                            "L1 + L2 + L3 + (D - r1*L1 - r2*L2 - r3*L3)/r4");
        assert_close(line->value, at_c(&b, r)->legs[1].length, 1e-15);
        assert_true(kent_hand_lines(d, KENT_SI) > 10);
        assert_true(kent_hand_lines(d, KENT_US) > 10);
        finish(&b, r);
    }
}

/* A casing from half a metre beyond what the leg needs, before its whole pipe ends:
 * that gives what till gives up to there, not its length's share. */
static void a_casing_behind_the_length_adds_nothing_to_the_factor(void **state)
{
    (void)state;
    kent_build plain = main_of_zones();
    plain.model->pipes[0].laying_length = 6.0;
    kent_restraints *r = sized(&plain);
    const double needs = demand() / holds(&plain, TILL, 1.5, 0.6);
    assert_close(at_c(&plain, r)->factor_reached, 1.5 * 6.0 / needs, 1e-9);
    assert_true(needs + 0.5 < 6.0);
    finish(&plain, r);

    kent_build cased = main_of_zones();
    cased.model->pipes[0].laying_length = 6.0;
    zoned(&cased, 200.0 + needs + 0.5, 210.0, TILL)->casing = true;
    r = sized(&cased);
    assert_true(at_c(&cased, r)->held);
    assert_close(at_c(&cased, r)->factor_reached, 1.5 * (needs + 0.5) / needs, 1e-6);
    assert_close(at_c(&cased, r)->utilisation, needs / (needs + 0.5), 1e-6);
    finish(&cased, r);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_stop_on_an_edge_belongs_to_the_ground_beyond),
        cmocka_unit_test(a_part_that_holds_nothing_is_passed_through_and_said),
        cmocka_unit_test(a_leg_keeps_the_cover_of_its_fitting_where_no_other_is_known),
        cmocka_unit_test(what_stands_near_a_restrained_bend_is_told),
        cmocka_unit_test(a_zone_of_the_same_ground_changes_nothing),
        cmocka_unit_test(a_leg_is_added_up_over_what_it_passes),
        cmocka_unit_test(a_casing_behind_the_length_adds_nothing_to_the_factor),
        cmocka_unit_test(cover_and_water_of_a_zone_count_in_it),
        cmocka_unit_test(a_part_goes_by_the_least_cover_along_it),
        cmocka_unit_test(a_leg_is_as_weak_as_the_weakest_stop_within_it),
        cmocka_unit_test(a_pipe_that_floats_has_no_length),
        cmocka_unit_test(peat_on_the_way_is_passed_through_and_said),
        cmocka_unit_test(peat_to_the_end_of_the_pipe_gives_no_length),
        cmocka_unit_test(what_a_soil_on_the_way_lacks_is_named),
        cmocka_unit_test(ground_that_changes_too_often_is_refused),
        cmocka_unit_test(a_branch_without_zones_goes_by_the_weaker_of_two_grounds),
        cmocka_unit_test(the_share_of_passive_pressure_goes_by_the_trench),
        cmocka_unit_test(in_a_zone_of_peat_it_says_how_far_its_edges_are),
        cmocka_unit_test(every_line_over_parts_follows_from_those_above),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
