/* What pushes another way than a face bears: legs shut one by one, suction. And what
 * governs where soil may bear more in some cases. Sizes by hand. */
#include "kent_hand.h"
#include "kent_net.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double RHO = 1000.0, G = 9.80665;
static const double CONCRETE = 23e3; /* N/m3 */

static double area(double diameter) { return 0.25 * PI * diameter * diameter; }

/* R (level 60 m) - X - E along +x, N and S; 0.32 m outside, 1.2 m deep in sand that
 * bears 100 kPa. */
static kent_build a_cross(void)
{
    kent_build b = kent_build_new();
    b.model->water.density = RHO;
    b.model->gravity = G;
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "X", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 10.0);
    (void)kent_build_point(&b, "N", 100.0, 100.0, 10.0);
    (void)kent_build_point(&b, "S", 100.0, -100.0, 10.0);
    (void)kent_build_pipe(&b, "A", "R X", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "B", "X E", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "C", "X N", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "D", "X S", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 60.0);
    (void)kent_build_soil(&b, "sand", 100e3, 18e3, 1.2);
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

/* ---- legs shut one by one -------------------------------------------------------- */

/* 50 m of water on 0.32 m is 39.4 kN; x 1.5 over 100 kPa, and the pipe's 0.0804 m2,
 * 0.672 m2: 0.85 x 0.80 m. As thick as wide. */
static void a_cross_is_held_on_every_side(void **state)
{
    (void)state;
    kent_net n = kent_net_of(a_cross());
    kent_restraints *r;
    const kent_holding *h = sized(&n, "X", &r);
    const double push = RHO * G * 50.0 * area(0.32);
    assert_true(h->held);
    assert_close(h->design_thrust, 1.5 * push, 1e-9);
    assert_close(h->block.bearing_area, 1.5 * push / 100e3, 1e-9);
    const kent_block *b = &h->block;
    assert_true(b->width * b->height - area(0.32) >= 1.5 * push / 100e3);
    assert_true(b->thickness == b->width);
    assert_close(b->volume, b->width * b->height * b->width, 1e-12);
    assert_int_equal(h->other_way_count, 3); /* west, north, south */
    for (size_t i = 0; i < 3; i++) {
        const kent_other_way *way = &h->other_ways[i];
        assert_close(way->load, 1.5 * push, 1e-9);
        assert_true(way->turned > 1.5); /* a right angle or more */
        assert_int_equal(way->taken, KENT_TAKEN_BY_FACE);
    }
    kent_hand_expect(h, "every side must reach undisturbed ground");
    assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 10);
    kent_restraints_free(r);
    kent_net_clear(&n);
}

/* As can_close says, none: nothing pushes, and that this stands on that is said. */
static void a_balanced_cross_is_told(void **state)
{
    (void)state;
    kent_build b = a_cross();
    const int note = kent_build_note(&b, "X");
    b.model->notes[note].stated.closes_stated = true;
    kent_net n = kent_net_of(b);
    kent_restraints *r;
    const kent_holding *h = sized(&n, "X", &r);
    assert_true(h->needs_nothing);
    assert_int_equal(h->other_way_count, 0);
    kent_hand_expect(h, "no leg of this cross can be shut");
    kent_restraints_free(r);
    kent_net_clear(&n);
}

/* Values for restrained lengths. */
static void put_grip(kent_build *b)
{
    kent_soil *s = &b->model->soils[0];
    s->friction_angle = 0.5;
    s->cohesion = 0.0;
    s->friction_ratio = 0.75;
    s->adhesion_ratio = 0.0;
    s->passive_ratio = 0.4;
    for (size_t i = 0; i < b->model->pipe_count; i++) {
        b->model->pipes[i].unit_mass = 70.0;
        b->model->pipes[i].joint = KENT_RESTRAINED;
        b->model->pipes[i].laying_length = 6.0;
    }
}

/* Every leg is pushed or pulled in its turn, and each needs a length: that of p A alone
 * on its whole perimeter, as behind a dead end. */
static void joints_hold_a_cross_on_all_its_legs(void **state)
{
    (void)state;
    kent_build b = a_cross();
    put_grip(&b);
    const int note = kent_build_note(&b, "X");
    b.model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
    kent_net n = kent_net_of(b);
    kent_restraints *r;
    const kent_holding *h = sized(&n, "X", &r);
    const double push = RHO * G * 50.0 * area(0.32);
    assert_int_equal(h->leg_count, 4);
    assert_true(h->held);
    for (size_t k = 0; k < 4; k++) {
        assert_int_equal(h->legs[k].port, k);
        assert_close(h->legs[k].demand, 1.5 * push, 1e-9);
        assert_close(h->legs[k].length, h->legs[0].length, 1e-9);
        assert_true(!h->legs[k].bears && h->legs[k].length > 1.0);
    }
    for (size_t i = 0; i < h->other_way_count; i++) {
        assert_int_equal(h->other_ways[i].taken, KENT_TAKEN_BY_JOINTS);
    }
    kent_hand_expect(h, "restrained length on each leg");
    assert_false(kent_hand_says(h, "takes no credit for the run"));
    kent_restraints_free(r);
    kent_net_clear(&n);
}

/* Nobody knows how one leg lies: the cross is not held, whatever the others do. */
static void a_cross_with_a_leg_that_nothing_holds_is_refused(void **state)
{
    (void)state;
    kent_build b = a_cross();
    put_grip(&b);
    const int note = kent_build_note(&b, "X");
    b.model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
    b.model->pipes[3].unit_mass = (double)NAN; /* the leg to S */
    b.model->pipes[3].material_density = (double)NAN;
    kent_net n = kent_net_of(b);
    kent_restraints *r;
    const kent_holding *h = sized(&n, "X", &r);
    assert_false(h->held);
    assert_int_equal(r->not_held, 2); /* and the end at S */
    kent_hand_expect(h, "the mass of the pipe is not known");
    kent_restraints_free(r);
    kent_net_clear(&n);
}

/* R - T - E with a branch to N; the leg to E can be shut. Empty, it leaves T pushed by
 * the run and the branch, so that the run counts nothing for the branch. */
static void a_tee_whose_run_can_be_shut_has_three_legs(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    b.model->water.density = RHO;
    b.model->gravity = G;
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "T", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 10.0);
    (void)kent_build_point(&b, "N", 100.0, 100.0, 10.0);
    (void)kent_build_pipe(&b, "A", "R T E", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "C", "T N", 0.2, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 60.0);
    (void)kent_build_soil(&b, "sand", 100e3, 18e3, 1.2);
    put_grip(&b);
    const int note = kent_build_note(&b, "T");
    kent_fitting_note *t = &b.model->notes[note];
    t->restraint = KENT_RESTRAINED_JOINTS;
    t->stated.run_length[0] = t->stated.run_length[1] = 12.0;
    t->stated.closes_stated = true;
    t->stated.closes_count = 1;
    b.model->closes = kent_alloc(1, sizeof *b.model->closes);
    assert_non_null(b.model->closes);
    b.model->closes[0] = 2; /* E */
    b.model->closes_count = 1;
    b.model->rules.run_share = 0.5;
    kent_net n = kent_net_of(b);
    kent_restraints *r;
    const kent_holding *h = sized(&n, "T", &r);
    const double p = RHO * G * 50.0, wide = p * area(0.32), narrow = p * area(0.22);
    assert_int_equal(h->leg_count, 3);
    for (size_t k = 0; k < 3; k++) {
        assert_close(h->legs[k].demand, 1.5 * hypot(wide, narrow), 1e-9);
        assert_true(h->legs[k].credit == 0.0);
    }
    assert_true(h->held);
    kent_hand_expect(h, "its legs can be shut");
    kent_restraints_free(r);
    kent_net_clear(&n);
}

/* What stands in the ground beside a cross, on any of its sides, keeps a block away. */
static void obstacles_are_looked_for_on_every_side_of_a_cross(void **state)
{
    (void)state;
    static const double WAYS[][2] = {{1, 0}, {-1, 0}, {0, 1}, {0, -1}};
    for (size_t i = 0; i < sizeof WAYS / sizeof WAYS[0]; i++) {
        for (int far = 0; far < 2; far++) {
            kent_build b = a_cross();
            const int note = kent_build_note(&b, "X");
            b.model->obstacles = kent_alloc(1, sizeof *b.model->obstacles);
            assert_non_null(b.model->obstacles);
            b.model->obstacles[0] =
                (kent_obstacle){.direction = {WAYS[i][0], WAYS[i][1], 0.0},
                                .distance = far ? 30.0 : 2.0,
                                .depth = 2.5};
            b.model->obstacle_count = 1;
            b.model->notes[note].obstacle_count = 1;
            kent_net n = kent_net_of(b);
            kent_restraints *r;
            const kent_holding *h = sized(&n, "X", &r);
            assert_int_equal(h->held, far);
            kent_restraints_free(r);
            kent_net_clear(&n);
        }
    }
}

/* A main of 2 m, 1.5 m from the cross and along that side of it. */
static void mains_beside_a_cross_are_seen_on_every_side(void **state)
{
    (void)state;
    static const double SIDES[][2] = {{1, 0}, {-1, 0}, {0, 1}, {0, -1}};
    for (size_t i = 0; i < sizeof SIDES / sizeof SIDES[0]; i++) {
        const double ux = SIDES[i][0], uy = SIDES[i][1];
        kent_build b = a_cross();
        (void)kent_build_point(&b, "P", 100.0 + 1.5 * ux + uy, 1.5 * uy + ux, 10.0);
        (void)kent_build_point(&b, "Q", 100.0 + 1.5 * ux - uy, 1.5 * uy - ux, 10.0);
        (void)kent_build_pipe(&b, "Z", "P Q", 0.1, 1000.0);
        (void)kent_build_fixed_level(&b, "P", 60.0);
        const int note = kent_build_note(&b, "Q");
        b.model->notes[note].restraint = KENT_NO_RESTRAINT;
        kent_net n = kent_net_of(b);
        kent_restraints *r;
        size_t count = 0;
        (void)sized(&n, "X", &r);
        (void)kent_space_of(&r->space, (size_t)kent_build_fitting_of(&n.build, "X"),
                            &count);
        assert_int_equal(count, 1);
        kent_restraints_free(r);
        kent_net_clear(&n);
    }
}

/* ---- suction --------------------------------------------------------------------- */

/* A bend of 90 degrees, 0.62 m outside: R - B - E. */
static kent_build a_bend(double base_friction)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "B", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 100.0, 100.0, 10.0);
    (void)kent_build_pipe(&b, "A", "R B E", 0.6, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 60.0);
    (void)kent_build_soil(&b, "sand", 150e3, 18e3, 1.5);
    b.model->soils[0].base_friction = base_friction;
    (void)kent_build_scenario(&b, "trip", 60.0);
    return b;
}

/* Under 10 bar and a suction (Pa, negative); returns what is left to free. */
static kent_restraints *sucked(kent_build *b, double suction)
{
    const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 5.0e5},
                                    {"suction", KENT_CASE_SUCTION, 1.5, suction}};
    kent_build_derive(b);
    return kent_hand_size(b, cases, 2);
}

/* 2 p A sin 45 of 0.1 bar is 4.27 kN, x 1.5; the block weighs its volume x 23 kN/m3. */
static void a_blocks_weight_takes_a_pull_on_its_base(void **state)
{
    (void)state;
    kent_build b = a_bend(0.4);
    kent_restraints *r = sucked(&b, -10e3);
    const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
    const double pull = 2.0 * 10e3 * area(0.62) * sin(0.25 * PI);
    const double weight = h->block.volume * CONCRETE;
    assert_true(h->held);
    assert_int_equal(h->governing, 0);
    assert_int_equal(h->runner_up, -1); /* suction pushes the other way */
    assert_true(isnan(h->runner_up_margin));
    assert_int_equal(h->other_way_count, 1);
    const kent_other_way *way = &h->other_ways[0];
    assert_int_equal(way->load_case, 1);
    assert_close(way->sideways, pull, 1e-9);
    assert_close(way->load, 1.5 * pull, 1e-9);
    assert_close(way->turned, PI, 1e-9);
    assert_close(way->friction, 0.4 * weight, 1e-9);
    assert_true(0.4 * weight > 1.5 * pull);
    assert_int_equal(way->taken, KENT_TAKEN_BY_FRICTION);
    kent_hand_expect(h, "takes it on its base");
    kent_restraints_free(r);
    kent_build_clear(&b);
}

/* Eight times that is 0.16 of the thrust, which nothing takes: not held, whether the
 * soil's friction is known or not, and what would hold it is said. */
static void what_nothing_takes_is_not_held(void **state)
{
    (void)state;
    kent_build with = a_bend(0.4), without = a_bend((double)NAN);
    kent_restraints *a = sucked(&with, -80e3), *b = sucked(&without, -80e3);
    const kent_holding *known = &a->fittings[kent_build_fitting_of(&with, "B")];
    const kent_holding *unknown = &b->fittings[kent_build_fitting_of(&without, "B")];
    const double load = 1.5 * 2.0 * 80e3 * area(0.62) * sin(0.25 * PI);
    assert_int_equal(known->other_ways[0].taken, KENT_TAKEN_BY_NOTHING);
    assert_int_equal(unknown->other_ways[0].taken, KENT_TAKEN_BY_NOTHING);
    assert_true(isnan(unknown->other_ways[0].friction));
    assert_true(known->other_ways[0].friction < load);
    assert_false(known->held || unknown->held);
    assert_int_equal(known->block.type, KENT_BLOCK_NONE);
    assert_true(known->block.bearing_area > 0.0);
    assert_true(isnan(known->utilisation) && !known->stability.judged);
    assert_true(a->not_held >= 1 && !known->footprint.placed);
    kent_hand_expect(known, "no block: 'suction' pulls the other way, with 34.2 kN");
    kent_hand_expect(known, "to one that weighs 128.1 kN"); /* 51.3 kN / 0.4 */
    kent_hand_expect(known, "restraint = \"anchor-block\"");
    kent_hand_expect(unknown, "give base_friction");
    assert_close(known->design_thrust, 1.5 * 2.0 * 5e5 * area(0.62) * sin(0.25 * PI),
                 1e-9);
    kent_restraints_free(a);
    kent_restraints_free(b);
    kent_build_clear(&with);
    kent_build_clear(&without);
}

/* Suction below a tenth of what governs is left to the fill, and said; what pushes with
 * the water's pressure is not, however little. */
static void slight_suction_alone_is_left_to_the_fill(void **state)
{
    (void)state;
    static const struct {
        double pull; /* Pa */
        bool held;
    } rows[] = {{-49e3, true}, {-51e3, false}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        kent_build b = a_bend((double)NAN);
        kent_restraints *r = sucked(&b, rows[i].pull);
        const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
        assert_int_equal(h->held, rows[i].held);
        assert_int_equal(h->other_ways[0].taken, KENT_TAKEN_BY_NOTHING);
        assert_int_equal(h->other_ways[0].slight, rows[i].held);
        kent_hand_expect(h, rows[i].held ? "left to the fill beside the pipe"
                                         : "its face does not bear that way");
        kent_restraints_free(r);
        kent_build_clear(&b);
    }
    const kent_other_way pushed = {.taken = KENT_TAKEN_BY_NOTHING, .slight = false};
    assert_true(kent_other_way_bars(&pushed));
}

/* Of block and joints, half each: the joints' half is more than a suction of 0.16. */
static void joints_beside_a_block_take_the_pull(void **state)
{
    (void)state;
    kent_build b = a_bend((double)NAN);
    put_grip(&b);
    const int note = kent_build_note(&b, "B");
    b.model->notes[note].restraint = KENT_BLOCK_AND_JOINTS;
    b.model->notes[note].stated.block_share = 0.5;
    kent_restraints *r = sucked(&b, -80e3);
    const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
    assert_true(h->held);
    assert_int_equal(h->other_ways[0].taken, KENT_TAKEN_BY_JOINTS);
    kent_restraints_free(r);
    b.model->notes[note].stated.block_share = 0.9; /* the joints' tenth is less */
    r = sucked(&b, -80e3);
    h = &r->fittings[kent_build_fitting_of(&b, "B")];
    assert_int_equal(h->other_ways[0].taken, KENT_TAKEN_BY_NOTHING);
    assert_false(h->held);
    kent_restraints_free(r);
    kent_build_clear(&b);
}

/* Turns a case's push in plan, to a share of it, and lifts it (N). */
static void turn_push(kent_load_case *c, double angle, double share, double up)
{
    kent_vec3 *t = &c->worst[KENT_SIDEWAYS].balance.thrust;
    const kent_vec3 was = *t;
    t->x = share * (was.x * cos(angle) - was.y * sin(angle));
    t->y = share * (was.x * sin(angle) + was.y * cos(angle));
    t->z = up;
}

/* 45 degrees are one way (9.19); of what goes another, the most is told; and what lifts
 * takes off the weight (9.20). Factor 1.5, concrete of 23 kN/m3. */
static void ways_part_at_45_degrees_and_the_most_is_told(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 5e5},
                                           {"static", KENT_CASE_STATIC, 1.5, 4e5},
                                           {"steady", KENT_CASE_STEADY, 1.5, 4e5}};
    static const struct {
        double first, second, share, up;
        size_t ways;
        int most;
    } rows[] = {{44.5, 0.0, 1.0, 0.0, 0, -1},
                {45.5, 0.0, 1.0, 0.0, 1, 1},
                {150.0, 160.0, 0.05, 500.0, 1, 2}};
    const double degree = PI / 180.0;
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        kent_build b = a_bend(0.4);
        kent_build_derive(&b);
        const int at = kent_build_fitting_of(&b, "B");
        kent_loads_result loads = kent_hand_loads(b.model, cases, 3);
        kent_load_case *c = loads.fittings[at].cases;
        turn_push(&c[1], rows[i].first * degree, 0.8 * rows[i].share, rows[i].up);
        turn_push(&c[2], rows[i].second * degree, rows[i].share, rows[i].up);
        kent_restraints *r = NULL;
        kent_error err = {0};
        assert_int_equal(kent_restraint_size(b.model, &loads, &r, &err), KENT_OK);
        const kent_holding *h = &r->fittings[at];
        assert_int_equal(h->other_way_count, rows[i].ways);
        if (rows[i].ways > 0) {
            assert_int_equal(h->other_ways[0].load_case, rows[i].most);
        }
        if (rows[i].up > 0.0) {
            assert_close(h->other_ways[0].friction,
                         0.4 * (h->block.volume * CONCRETE - 1.5 * rows[i].up), 1e-9);
        }
        kent_restraints_free(r);
        kent_hand_clear(&loads);
        kent_build_clear(&b);
    }
}

/* An anchor block bears from either side. */
static void an_anchor_block_bears_the_pull_on_its_other_side(void **state)
{
    (void)state;
    kent_build b = a_bend((double)NAN);
    const int note = kent_build_note(&b, "B");
    b.model->notes[note].restraint = KENT_ANCHOR_BLOCK;
    kent_restraints *r = sucked(&b, -80e3);
    const kent_holding *h = &r->fittings[kent_build_fitting_of(&b, "B")];
    assert_int_equal(h->other_ways[0].taken, KENT_TAKEN_BY_FACE);
    assert_false(kent_hand_says(h, "the other way"));
    kent_restraints_free(r);
    kent_build_clear(&b);
}

/* Below 500 N nothing is told: 1 kPa pulls with 427 N. */
static void a_slight_pull_is_not_told(void **state)
{
    (void)state;
    kent_build b = a_bend((double)NAN);
    kent_restraints *r = sucked(&b, -1e3);
    assert_int_equal(r->fittings[kent_build_fitting_of(&b, "B")].other_way_count, 0);
    kent_restraints_free(r);
    kent_build_clear(&b);
}

/* The branch with the run empty pushes as with the run full, p A of the branch. */
static void an_empty_run_is_not_counted_on(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    (void)kent_build_point(&b, "T", 100.0, 0.0, 10.0);
    (void)kent_build_point(&b, "E", 200.0, 0.0, 10.0);
    (void)kent_build_point(&b, "N", 100.0, 100.0, 10.0);
    (void)kent_build_pipe(&b, "A", "R T E", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "C", "T N", 0.3, 1000.0);
    (void)kent_build_fixed_level(&b, "R", 60.0);
    (void)kent_build_soil(&b, "sand", 100e3, 18e3, 1.2);
    kent_net n = kent_net_of(b);
    kent_restraints *r;
    const kent_holding *h = sized(&n, "T", &r);
    assert_true(kent_hand_remarks(h, "with the run shut off and empty"));
    assert_close(h->design_thrust, 1.5 * RHO * G * 50.0 * area(0.32), 1e-9);
    kent_restraints_free(r);
    kent_net_clear(&n);
}

/* ---- what governs ---------------------------------------------------------------- */

/* Test 10 bar x 1.5 / 1.33 against still water of 8 bar x 1.5: the second governs, by
 * 8/(10/1.33) - 1 = 6.4 %; and sizes the face. */
static void soil_that_may_bear_more_under_test_changes_what_governs(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 10e5},
                                           {"static", KENT_CASE_STATIC, 1.5, 8e5}};
    for (int more = 0; more < 2; more++) {
        kent_build b = a_bend((double)NAN);
        b.model->ground.cover = 3.0;
        kent_build_derive(&b);
        const int at = kent_build_fitting_of(&b, "B");
        kent_loads_result loads = kent_hand_loads(b.model, cases, 2);
        loads.fittings[at].cases[0].increase = more ? 1.33 : 1.0;
        kent_restraints *r = NULL;
        kent_error err = {0};
        assert_int_equal(kent_restraint_size(b.model, &loads, &r, &err), KENT_OK);
        const kent_holding *h = &r->fittings[at];
        const double turn = 2.0 * area(0.62) * sin(0.25 * PI);
        assert_int_equal(h->governing, more ? 1 : 0);
        assert_close(h->design_thrust, 1.5 * turn * (more ? 8e5 : 10e5), 1e-9);
        assert_close(h->runner_up_load, 1.5 * turn * (more ? 10e5 / 1.33 : 8e5), 1e-9);
        assert_close(h->runner_up_margin, more ? 8.0 * 1.33 / 10.0 - 1.0 : 0.25, 1e-9);
        assert_close(h->block.bearing_area, h->design_thrust / 150e3, 1e-9);
        kent_restraints_free(r);
        kent_hand_clear(&loads);
        kent_build_clear(&b);
    }
}

/* Where it governs, its line is in the calculation, which adds up. */
static void the_increase_is_printed(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"static", KENT_CASE_STATIC, 1.5, 10e5}};
    kent_build b = a_bend((double)NAN);
    b.model->ground.cover = 3.0;
    kent_build_derive(&b);
    const int at = kent_build_fitting_of(&b, "B");
    kent_loads_result loads = kent_hand_loads(b.model, cases, 1);
    loads.fittings[at].cases[0].increase = 1.25;
    kent_restraints *r = NULL;
    kent_error err = {0};
    assert_int_equal(kent_restraint_size(b.model, &loads, &r, &err), KENT_OK);
    const kent_holding *h = &r->fittings[at];
    const kent_line *k = kent_derivation_find(&h->derivation, "k");
    const kent_line *f = kent_derivation_find(&h->derivation, "Fh");
    assert_true(k && k->value == 1.25);
    assert_non_null(f);
    assert_close(f->value, h->design_thrust, 1e-12);
    assert_close(f->value, 1.5 * 2.0 * 10e5 * area(0.62) * sin(0.25 * PI) / 1.25, 1e-9);
    assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 10);
    assert_true(kent_hand_lines(&h->derivation, KENT_US) > 10);
    /* the factor reached is that of the soil with its increase */
    const kent_block *face = &h->block;
    assert_close(h->factor_reached,
                 face->width * face->height * 150e3 * 1.25 /
                     (2.0 * 10e5 * area(0.62) * sin(0.25 * PI)),
                 1e-9);
    kent_restraints_free(r);
    kent_hand_clear(&loads);
    kent_build_clear(&b);
}

/* ---- nothing goes by the compass ------------------------------------------------- */

static double random_in(unsigned *seed, double from, double to)
{
    *seed = *seed * 1664525u + 1013904223u;
    return from + (to - from) * (double)(*seed >> 8) / 16777216.0;
}

/* A main with a bend, a tee or a cross, sloping legs, turned by an angle in plan. */
static kent_net turned_main(unsigned seed, double turn)
{
    static kent_made t;
    kent_build b = kent_build_new();
    const char *ids[] = {"R", "B", "X", "E", "N", "S"};
    const double plan[][2] = {{0, 0},   {100, 0},  {180, 0},
                              {260, 0}, {180, 90}, {180, -80}};
    unsigned s = seed * 7919u + 1u;
    for (size_t i = 0; i < sizeof ids / sizeof ids[0]; i++) {
        const double x = plan[i][0] + random_in(&s, -15.0, 15.0);
        const double y = plan[i][1] + random_in(&s, -15.0, 15.0);
        const double z = 10.0 + random_in(&s, -3.0, 3.0);
        (void)kent_build_point(&b, ids[i], x * cos(turn) - y * sin(turn),
                               x * sin(turn) + y * cos(turn), z);
    }
    (void)kent_build_pipe(&b, "A", "R B X E", 0.3, 1000.0);
    (void)kent_build_pipe(&b, "C", seed % 2 ? "X N" : "S X N", 0.2, 1000.0);
    (void)kent_build_fixed_level(&b, "R", random_in(&s, 40.0, 120.0));
    (void)kent_build_soil(&b, "sand", random_in(&s, 80e3, 250e3), 18e3,
                          random_in(&s, 1.0, 2.5));
    b.model->soils[0].base_friction = 0.4;
    b.model->soils[0].vertical_bearing = 150e3;
    (void)kent_build_scenario(&b, "surge", 20.0);
    kent_net n = kent_net_of(b);
    t.count = 0;
    for (int i = 0; i < 20; i++) {
        kent_made_add(&t, &n, 0.1 * i, random_in(&s, 2.0, 160.0),
                      random_in(&s, -0.05, 0.05));
    }
    kent_made_take(&t, &n, 0, 0.1, 64);
    return n;
}

static void assert_same(double a, double b)
{
    if (isnan(a) && isnan(b)) return;
    assert_within(a, b, 1e-7 * (fabs(a) + fabs(b)) + 1e-9);
}

/* Random mains, with a surge by hand, through the whole chain: every vector turns, and
 * no size, use or way changes. */
static void turning_a_case_turns_its_thrusts_and_no_size(void **state)
{
    (void)state;
    size_t blocks = 0, ways = 0;
    for (unsigned seed = 0; seed < 30; seed++) {
        const double turn = 0.1 + 0.2 * seed;
        kent_net n = turned_main(seed, 0.0), t = turned_main(seed, turn);
        kent_restraints *r, *q;
        (void)sized(&n, "B", &r);
        (void)sized(&t, "B", &q);
        assert_int_equal(r->fitting_count, q->fitting_count);
        for (size_t i = 0; i < r->fitting_count; i++) {
            const kent_holding *a = &r->fittings[i], *b = &q->fittings[i];
            const kent_fitting_loads *la = &n.loads->fittings[i];
            const kent_fitting_loads *lb = &t.loads->fittings[i];
            assert_int_equal(la->count, lb->count);
            for (size_t k = 0; k < la->count; k++) {
                const kent_vec3 u = kent_instant_lasting(&la->cases[k].worst[0]);
                const kent_vec3 v = kent_instant_lasting(&lb->cases[k].worst[0]);
                const double near = 1e-7 * kent_vec3_length(u) + 1e-3;
                assert_within(v.x, u.x * cos(turn) - u.y * sin(turn), near);
                assert_within(v.y, u.x * sin(turn) + u.y * cos(turn), near);
                assert_within(v.z, u.z, near);
            }
            assert_same(a->design_thrust, b->design_thrust);
            assert_int_equal(a->held, b->held);
            assert_same(a->block.bearing_area, b->block.bearing_area);
            assert_same(a->block.width, b->block.width);
            assert_same(a->block.height, b->block.height);
            assert_same(a->block.volume, b->block.volume);
            assert_same(a->utilisation, b->utilisation);
            assert_int_equal(a->other_way_count, b->other_way_count);
            blocks += a->block.type != KENT_BLOCK_NONE;
            ways += a->other_way_count;
        }
        kent_restraints_free(r);
        kent_restraints_free(q);
        kent_net_clear(&n);
        kent_net_clear(&t);
    }
    assert_true(blocks > 20 && ways > 20);
}

/* One bend of an angle, or two of its parts: 2 sin(t/2) <= 2 sin(t1/2) + 2 sin(t2/2).
 * Through the whole chain of geometry, steady state and balance. */
static void splitting_a_bend_never_lowers_the_summed_thrust(void **state)
{
    (void)state;
    unsigned s = 12345u;
    for (int trial = 0; trial < 40; trial++) {
        const double first = random_in(&s, 0.1, 1.4), second = random_in(&s, 0.1, 1.4);
        const double whole = first + second;
        double thrust[2] = {0.0, 0.0};
        for (int split = 0; split < 2; split++) {
            kent_build b = kent_build_new();
            (void)kent_build_point(&b, "R", 0.0, 0.0, 0.0);
            (void)kent_build_point(&b, "B1", 100.0, 0.0, 0.0);
            double x = 100.0, y = 0.0;
            if (split) {
                x += 50.0 * cos(first);
                y += 50.0 * sin(first);
                (void)kent_build_point(&b, "B2", x, y, 0.0);
            }
            (void)kent_build_point(&b, "E", x + 100.0 * cos(whole),
                                   y + 100.0 * sin(whole), 0.0);
            (void)kent_build_pipe(&b, "A", split ? "R B1 B2 E" : "R B1 E", 0.4, 1000.0);
            (void)kent_build_fixed_level(&b, "R", 80.0);
            kent_net n = kent_net_of(b);
            kent_net_finish(&n);
            for (int k = 0; k <= split; k++) {
                const kent_load_case *c = kent_net_case(&n, k ? "B2" : "B1", "static");
                thrust[split] +=
                    kent_vec3_length(c->worst[KENT_RESULTANT].balance.thrust);
            }
            kent_net_clear(&n);
        }
        assert_true(thrust[1] >= thrust[0] * (1.0 - 1e-12));
        assert_close(thrust[0], 2.0 * 1000.0 * G * 80.0 * area(0.42) * sin(0.5 * whole),
                     1e-9);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_cross_is_held_on_every_side),
        cmocka_unit_test(a_balanced_cross_is_told),
        cmocka_unit_test(joints_hold_a_cross_on_all_its_legs),
        cmocka_unit_test(a_cross_with_a_leg_that_nothing_holds_is_refused),
        cmocka_unit_test(a_tee_whose_run_can_be_shut_has_three_legs),
        cmocka_unit_test(obstacles_are_looked_for_on_every_side_of_a_cross),
        cmocka_unit_test(a_blocks_weight_takes_a_pull_on_its_base),
        cmocka_unit_test(what_nothing_takes_is_not_held),
        cmocka_unit_test(slight_suction_alone_is_left_to_the_fill),
        cmocka_unit_test(joints_beside_a_block_take_the_pull),
        cmocka_unit_test(ways_part_at_45_degrees_and_the_most_is_told),
        cmocka_unit_test(mains_beside_a_cross_are_seen_on_every_side),
        cmocka_unit_test(an_anchor_block_bears_the_pull_on_its_other_side),
        cmocka_unit_test(a_slight_pull_is_not_told),
        cmocka_unit_test(an_empty_run_is_not_counted_on),
        cmocka_unit_test(soil_that_may_bear_more_under_test_changes_what_governs),
        cmocka_unit_test(the_increase_is_printed),
        cmocka_unit_test(turning_a_case_turns_its_thrusts_and_no_size),
        cmocka_unit_test(splitting_a_bend_never_lowers_the_summed_thrust),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
