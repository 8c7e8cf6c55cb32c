/* What must hold of every block, whatever the ground: cases drawn at random, always the
 * same ones. */
#include "kent_hand.h"

#include <math.h>
#include <stdint.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;

enum { DRAWS = 400 };

/* Numerical Recipes' linear congruential generator (Press et al., chapter 7). */
static uint32_t seed = 1u;

static double draw(double least, double most)
{
    seed = 1664525u * seed + 1013904223u;
    return least + (most - least) * ((double)seed / 4294967296.0);
}

typedef struct drawn {
    kent_bearing_route route;
    double cover, table;          /* m */
    double weight, phi, cohesion; /* N/m3, rad, Pa */
    double wall;                  /* rad; NAN */
    double share, pressure;       /* -, Pa */
    double falls;                 /* rad; NAN */
    double rise;                  /* m, that the main comes up to E by and leaves it by:
                                     a crest; below 0 a sag; 0: an end */
    bool stays;                   /* sliding and overturning are asked for */
} drawn;

static drawn draw_case(kent_bearing_route route)
{
    drawn d = {.route = route, .table = (double)INFINITY, .wall = (double)NAN};

    d.cover = draw(0.8, 4.0);
    d.weight = draw(15e3, 21e3);
    d.phi = draw(20.0, 40.0) * PI / 180.0;
    d.cohesion = draw(0.0, 1.0) < 0.5 ? 0.0 : draw(0.0, 20e3);
    d.share = draw(0.2, 0.9);
    d.pressure = draw(0.1e6, 1.5e6);
    d.falls = (double)NAN;
    if (draw(0.0, 1.0) < 0.3) d.wall = draw(0.0, 0.5) * d.phi;
    return d;
}

/* What holds E; free it with let_go. */
typedef struct sized {
    kent_build b;
    kent_restraints *r;
    const kent_holding *h;
} sized;

static sized size(const drawn *d, const kent_obstacle *o)
{
    sized s = {.b = kent_build_new()};
    kent_build *b = &s.b;
    const kent_hand_case test = {"test", KENT_CASE_TEST, 1.5, d->pressure};

    (void)kent_build_point(b, "A", -300.0, 0.0, 50.0 - d->rise);
    (void)kent_build_point(b, "E", 0.0, 0.0, 50.0);
    if (d->rise != 0.0) (void)kent_build_point(b, "Z", 300.0, 0.0, 50.0 - d->rise);
    (void)kent_build_pipe(b, "P", d->rise != 0.0 ? "A E Z" : "A E", 0.3, 1000.0);
    (void)kent_build_fixed_level(b, "A", 150.0);
    b->model->loads.test_pressure = d->pressure;
    (void)kent_build_soil(b, "drawn", 150e3, d->weight, d->cover);
    kent_soil *soil = &b->model->soils[0];
    soil->route = d->route;
    soil->bearing_gradient = 60e3;
    soil->by_depth[0] = (kent_depth_row){0.5, 40e3};
    soil->by_depth[1] = (kent_depth_row){4.0, 160e3};
    soil->by_depth_count = 2;
    soil->friction_angle = d->phi;
    soil->cohesion = d->cohesion;
    soil->wall_friction = d->wall;
    soil->passive_share = d->share;
    b->model->ground.water_table = d->table;
    soil->base_friction = 0.4;
    b->model->rules.largest_volume = 1e3;
    b->model->rules.strap_stress = 140e6;
    b->model->rules.strap_diameter = 0.016;
    if (d->stays) {
        b->model->rules.factor_sliding = b->model->rules.factor_overturning = 1.5;
        b->model->rules.factor_flotation = 1.2;
    }
    const int note = kent_build_note(b, "E");
    b->model->notes[note].restraint = (int)KENT_THRUST_BLOCK;
    b->model->notes[note].stated.slope = (kent_slope){{1.0, 0.0, 0.0}, d->falls};
    if (o) {
        b->model->obstacles = kent_alloc(1, sizeof *b->model->obstacles);
        assert_non_null(b->model->obstacles);
        b->model->obstacles[0] = *o;
        b->model->obstacle_count = 1;
        b->model->notes[note].obstacle_count = 1;
    }
    kent_build_derive(b);
    s.r = kent_hand_size(b, &test, 1);
    s.h = &s.r->fittings[kent_build_fitting_of(b, "E")];
    return s;
}

static void let_go(sized *s)
{
    kent_restraints_free(s->r);
    kent_build_clear(&s->b);
}

static kent_bearing_route any_route(int i)
{
    static const kent_bearing_route routes[] = {
        KENT_BEARING_CONSTANT, KENT_BEARING_BY_DEPTH, KENT_BEARING_GRADIENT,
        KENT_BEARING_PASSIVE};
    return routes[i % 4];
}

static void an_obstacle_never_raises_a_resistance(void **state)
{
    (void)state;
    int refused = 0, kept = 0;
    for (int i = 0; i < DRAWS; i++) {
        const drawn d = draw_case(any_route(i));
        const double towards = draw(-PI, PI);
        const kent_obstacle o = {.what = "sewer",
                                 .direction = {cos(towards), sin(towards), 0.0},
                                 .distance = draw(0.0, 12.0),
                                 .depth = draw(0.5, 5.0)};
        sized without = size(&d, NULL), with = size(&d, &o);
        assert_true(without.h->held || !with.h->held);
        if (with.h->held) {
            assert_close(with.h->factor_reached, without.h->factor_reached, 1e-12);
            assert_close(with.h->block.volume, without.h->block.volume, 1e-12);
        }
        refused += without.h->held && !with.h->held ? 1 : 0;
        kept += with.h->held ? 1 : 0;
        let_go(&without);
        let_go(&with);
    }
    assert_true(refused > 10 && kept > 10); /* both were seen */
}

/* Dry, passive, before rounding: the area that is asked for. */
static void a_deeper_axis_never_needs_a_larger_face(void **state)
{
    (void)state;
    for (int i = 0; i < DRAWS; i++) {
        drawn d = draw_case(KENT_BEARING_PASSIVE);
        if (i % 4 == 0) d.falls = draw(0.01, 0.9) * d.phi;
        sized shallow = size(&d, NULL);
        d.cover += draw(0.01, 3.0);
        sized deep = size(&d, NULL);
        assert_true(deep.h->block.bearing_area <= shallow.h->block.bearing_area);
        let_go(&shallow);
        let_go(&deep);
    }
}

/* m2 of steel that ties the pipe down. */
static double steel_of(const kent_holding *h)
{
    const kent_straps *s = &h->straps;
    return s->legs > 0 ? s->legs * s->diameter * s->diameter : 0.0;
}

/* What is asked for before rounding: area, weight; and rods. */
static void more_pressure_never_makes_a_smaller_block(void **state)
{
    (void)state;
    int faces = 0, weights = 0, bases = 0;
    for (int i = 0; i < DRAWS; i++) {
        drawn d = draw_case(any_route(i));
        d.table = draw(0.0, 1.0) < 0.5 ? draw(0.0, 4.0) : (double)INFINITY;
        d.rise = 30.0 * (double)(i / 4 % 3 - 1);
        d.stays = i / 12 % 2 == 0;
        sized low = size(&d, NULL);
        d.pressure *= draw(1.0, 2.0);
        sized high = size(&d, NULL);
        assert_true(low.h->held || !high.h->held);
        if (high.h->held && d.rise > 0.0) {
            assert_true(high.h->block.volume >= low.h->block.volume);
            assert_true(steel_of(high.h) >= steel_of(low.h));
            weights++;
        } else if (high.h->held) {
            assert_true(high.h->block.bearing_area >= low.h->block.bearing_area);
            faces += d.rise == 0.0 ? 1 : 0;
            bases += d.rise < 0.0 ? 1 : 0;
        }
        let_go(&low);
        let_go(&high);
    }
    assert_true(faces > 10 && weights > 10 && bases > 10);
}

/* Nor does a steeper slope, water nearer to the surface, or loose ground. */
static void worse_ground_never_bears_more(void **state)
{
    (void)state;
    for (int i = 0; i < DRAWS; i++) {
        drawn d = draw_case(any_route(i));
        sized level = size(&d, NULL);
        const double bears = level.h->allowable_bearing;
        let_go(&level);

        d.falls = draw(0.01, 0.9) * d.phi;
        sized falling = size(&d, NULL);
        const double on_slope = falling.h->allowable_bearing;
        let_go(&falling);
        assert_true(on_slope < bears);
        d.falls = draw(1.0, 1.1) * d.falls;
        sized steeper = size(&d, NULL);
        assert_true(steeper.h->allowable_bearing <= on_slope);
        let_go(&steeper);

        d.falls = (double)NAN;
        double last = bears;
        for (int k = 0; k <= 16; k++) {
            d.table = 6.0 - 0.37 * k;
            sized wet = size(&d, NULL);
            assert_true(wet.h->allowable_bearing <= last * (1.0 + 1e-12));
            last = wet.h->allowable_bearing;
            let_go(&wet);
        }
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(an_obstacle_never_raises_a_resistance),
        cmocka_unit_test(a_deeper_axis_never_needs_a_larger_face),
        cmocka_unit_test(more_pressure_never_makes_a_smaller_block),
        cmocka_unit_test(worse_ground_never_bears_more),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
