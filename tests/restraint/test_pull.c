/* What strings of fused pipe pull at their ends, and what holds them. */
#include "kent_alloc_fail.h"
#include "kent_hand.h"
#include "kent_net.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

static const double PI = 3.14159265358979323846;

/* Polyethylene SDR 11 of 450 mm outside. Poisson's ratio 0.45, 1 GPa for hours and 200
 * MPa for years, 0.18 mm per m and K: Handbook of Polyethylene Pipe, Plastics Pipe
 * Institute, 2nd edition, chapter 3 (from memory, rounded). */
static const double OD = 0.45, WALL = 0.45 / 11.0;

/* ---- plain functions ------------------------------------------------------------- */

/* Lame's thick wall (1852; e.g. Timoshenko, Strength of Materials II): hoop and radial
 * stress at each radius, multiplied by Poisson's ratio and summed over the wall. */
static void pressure_pulls_as_a_thick_wall_does(void **state)
{
    (void)state;
    const double p = 10e5, nu = 0.45, a = 0.5 * OD - WALL, b = 0.5 * OD;
    const int rings = 20000;
    double force = 0.0;

    for (int i = 0; i < rings; i++) {
        const double r = a + (b - a) * (i + 0.5) / rings;
        const double k = p * a * a / (b * b - a * a);
        const double hoop = k * (1.0 + b * b / (r * r));
        const double radial = k * (1.0 - b * b / (r * r));
        force += nu * (hoop + radial) * 2.0 * PI * r * (b - a) / rings;
    }
    assert_close(kent_pull_of_pressure(p, nu, 2.0 * a), force, 1e-9);
}

/* Plastics Pipe Institute, Handbook of Polyethylene Pipe, "Poisson effect" (from
 * memory): S = p (DR - 1)/2 nu, F = S pi OD^2 (1/DR - 1/DR^2). */
static void the_handbook_has_the_mean_diameter(void **state)
{
    (void)state;
    const double dr = 11.0, p = 10e5, nu = 0.45;
    const double stress = p * (dr - 1.0) / 2.0 * nu;
    const double force = stress * PI * OD * OD * (1.0 / dr - 1.0 / (dr * dr));
    assert_close(kent_pull_of_pressure_mean(p, nu, OD, WALL), force, 1e-12);
}

/* A wall that keeps its volume passes pressure on as a liquid would: the pull with what
 * presses on its end is p on the whole outside. */
static void rubber_pulls_with_the_whole_outside(void **state)
{
    (void)state;
    const double inside = OD - 2.0 * WALL;
    const double all = kent_pull_of_pressure(1e6, 0.5, inside) +
                       kent_pull_of_end_face(1e6, OD, inside);
    assert_close(all, 1e6 * 0.25 * PI * OD * OD, 1e-12);
}

/* No handbook value is above what is taken here, at any wall thickness. */
static void what_is_taken_is_never_below_the_handbook(void **state)
{
    (void)state;
    for (int i = 0; i < 37; i++) { /* standard dimension ratios from 6 to 185 */
        for (int k = 0; k <= 5; k++) {
            const double wall = 1.0 / (6.0 * pow(1.1, i)), inside = 1.0 - 2.0 * wall;
            const double nu = 0.25 + 0.05 * k;
            const double taken = kent_pull_of_pressure(1.0, nu, inside) +
                                 kent_pull_of_end_face(1.0, 1.0, inside);
            assert_true(taken >= kent_pull_of_pressure_mean(1.0, nu, 1.0, wall));
        }
    }
}

static void cooling_pulls_by_modulus_and_wall(void **state)
{
    (void)state;
    assert_close(kent_pull_of_cooling(200e6, 1.8e-4, 15.0, 0.05), 27000.0, 1e-12);
}

/* Strain added up along the string, from its middle or from where it is held, to its
 * end with friction taking up the pull: the closed forms are those sums. */
static double summed(double pull, double friction, double stiffness, double length)
{
    const double reach = fmin(0.5 * length, pull / friction);
    const int steps = 100000;
    double moved = 0.0;

    for (int i = 0; i < steps; i++) {
        const double x = reach * (i + 0.5) / steps; /* from the free end */
        moved += (pull - friction * x) / stiffness * reach / steps;
    }
    return moved;
}

static void movement_is_strain_added_up(void **state)
{
    (void)state;
    const double pull = 1e5, friction = 5e3, stiffness = 2e7; /* 20 m */
    for (int i = 1; i < 20; i++) {
        const double length = 5.0 * i;
        assert_close(kent_pull_movement(pull, friction, stiffness, length),
                     summed(pull, friction, stiffness, length), 1e-8);
    }
}

/* Beyond twice the development length more string moves the end no further. */
static void length_counts_only_up_to_twice_the_development(void **state)
{
    (void)state;
    const double at = kent_pull_movement(1e5, 5e3, 2e7, 40.0);
    assert_close(kent_pull_development(1e5, 5e3), 20.0, 1e-12);
    assert_close(kent_pull_movement(1e5, 5e3, 2e7, 4000.0), at, 1e-12);
    assert_true(kent_pull_movement(1e5, 5e3, 2e7, 39.0) < at);
}

/* ---- ends ------------------------------------------------------------------------ */

/* Sand: 19 kN/m3, 32 degrees, f 0.7 of it on either pipe, 1.2 m of cover. */
static void sand(kent_build *b)
{
    const int s = kent_build_soil(b, "sand", 100e3, 19e3, 1.2);
    b->model->soils[s].friction_angle = 32.0 * PI / 180.0;
    b->model->soils[s].cohesion = 0.0;
    b->model->soils[s].friction_ratio = 0.7;
    b->model->soils[s].adhesion_ratio = 0.0;
    b->model->soils[s].passive_ratio = 0.5;
}

/* R ===== P ----- E: fused from a tank to P, push-on iron beyond; 16 bar of test. */
static kent_build fused_to_iron(double string)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    (void)kent_build_point(&b, "P", string, 0.0, 0.0);
    (void)kent_build_point(&b, "E", string + 500.0, 0.0, 0.0);
    const int pe = kent_build_pipe(&b, "pe", "R P", OD - 2.0 * WALL, 300.0);
    kent_pipe *p = &b.model->pipes[pe];
    p->outside_diameter = OD;
    p->wall = WALL;
    p->joint = KENT_FUSED;
    p->plastic = true;
    p->modulus = 1e9;
    p->long_modulus = 200e6;
    p->poisson = 0.45;
    p->expansion = 1.8e-4;
    p->material_density = 955.0;
    const int iron = kent_build_pipe(&b, "iron", "P E", 0.43, 1000.0);
    b.model->pipes[iron].material_density = 7050.0;
    b.model->pipes[iron].laying_length = 6.0;
    (void)kent_build_fixed_level(&b, "R", 80.0);
    sand(&b);
    b.model->loads.test_pressure = 16e5;
    b.model->loads.cooling = 15.0;
    return b;
}

typedef struct work {
    kent_net net;
    kent_restraints *r;
} work;

static work work_of(kent_build b)
{
    work w = {.net = kent_net_of(b)};
    kent_error err = {0};
    kent_net_finish(&w.net);
    if (kent_restraint_size(w.net.model, w.net.loads, &w.r, &err)) {
        fail_msg("%s", err.what);
    }
    return w;
}

static void work_clear(work *w)
{
    kent_restraints_free(w->r);
    kent_net_clear(&w->net);
}

static const kent_pull_end *end_at(const work *w, const char *point)
{
    for (size_t i = 0; i < w->r->pulls.end_count; i++) {
        const kent_pull_end *p = &w->r->pulls.ends[i];
        const kent_string_end *e = &w->net.loads->strings.ends[p->end];
        if (strcmp(w->net.model->points[e->point].id, point) == 0) return p;
    }
    fail_msg("no end at %s", point);
    return NULL;
}

static bool says(const kent_notes *n, const char *words)
{
    for (size_t i = 0; i < n->count; i++) {
        if (strstr(n->text[i], words)) return true;
    }
    return false;
}

/* By hand: 23.1 .. 23.10 with the test's 16 bar and the short-term modulus. */
static void an_end_at_slipping_joints_must_be_held(void **state)
{
    (void)state;
    work w = work_of(fused_to_iron(300.0));
    const kent_pull_end *p = end_at(&w, "P");
    const kent_string_end *e = &w.net.loads->strings.ends[p->end];
    const double inside = OD - 2.0 * WALL, wall = PI * (OD - WALL) * WALL;
    const double of_pressure = 2.0 * 0.45 * 16e5 * 0.25 * PI * inside * inside;
    const double of_face = 16e5 * wall;
    const double of_cooling = 1e9 * 1.8e-4 * 15.0 * wall;

    assert_true(p->known);
    assert_string_equal(e->cases[p->governing].name, "test");
    assert_close(p->of_pressure, of_pressure, 1e-12);
    assert_close(p->of_end_face, of_face, 1e-12);
    assert_close(p->of_cooling, of_cooling, 1e-12);
    assert_close(p->pull, of_pressure + of_face + of_cooling, 1e-12);
    assert_close(p->factored, 1.5 * p->pull, 1e-12);
    /* 11.4, 11.5: (2 x 19 x 1.2 x OD + pipe + water) tan(0.7 x 32 deg) */
    const double weight =
        2.0 * 19e3 * 1.2 * OD + wall * 955.0 * w.net.model->gravity +
        w.net.model->water.density * w.net.model->gravity * 0.25 * PI * inside * inside;
    const double friction = weight * tan(0.7 * 32.0 * PI / 180.0);
    assert_close(p->friction, friction, 1e-9);
    assert_close(p->development, p->pull / friction, 1e-9);
    assert_true(p->bounded);
    /* the stiff wall's test moves it further than years of 7.8 bar and cold do */
    const double lasts = w.net.model->water.density * w.net.model->gravity * 80.0;
    const double rest = lasts / 16e5 * (of_pressure + of_face) + 0.2 * of_cooling;
    const double by_rest = rest * rest / (2.0 * friction * 200e6 * wall);
    const double by_test = p->pull * p->pull / (2.0 * friction * 1e9 * wall);
    assert_true(by_test > by_rest);
    assert_close(p->movement, by_test, 1e-9);
    assert_int_equal(p->holder, KENT_PULL_NOTHING);
    assert_true(p->beyond_length > 1.0);
    assert_int_equal(p->beyond_pipes, (int)ceil(p->beyond_length / 6.0));
    assert_true(says(&p->cautions, "nothing in the case holds it"));
    assert_true(kent_hand_lines(&p->derivation, KENT_SI) > 8);
    assert_true(kent_hand_lines(&p->derivation, KENT_US) > 8);
    work_clear(&w);
}

/* Held, the pull is the same whatever the string's length; free, a short one moves
 * less. */
static void the_length_of_a_string_is_no_part_of_its_pull(void **state)
{
    (void)state;
    work far = work_of(fused_to_iron(2000.0)), near = work_of(fused_to_iron(20.0));
    const kent_pull_end *a = end_at(&far, "P"), *b = end_at(&near, "P");
    assert_close(a->pull, b->pull, 1e-12);
    assert_true(a->bounded);
    assert_false(b->bounded);
    assert_true(b->movement < a->movement);
    assert_true(kent_hand_lines(&b->derivation, KENT_SI) > 8);
    work_clear(&far);
    work_clear(&near);
}

/* Under 10 bar of test it is the years that move it most, by the long-term modulus. */
static void what_lasts_may_move_it_further_than_it_pulls(void **state)
{
    (void)state;
    kent_build b = fused_to_iron(300.0);
    b.model->loads.test_pressure = 10e5;
    work w = work_of(b);
    const kent_pull_end *p = end_at(&w, "P");
    const kent_string_end *e = &w.net.loads->strings.ends[p->end];
    assert_string_equal(e->cases[p->governing].name, "test");
    assert_true(e->cases[p->moves].lasts);
    assert_close(p->moving_modulus, 200e6, 1e-12);
    assert_true(p->moving_pull < p->pull);
    assert_close(p->movement,
                 kent_pull_movement(p->moving_pull, p->friction,
                                    p->moving_modulus * p->wall_area, 300.0),
                 1e-12);
    assert_true(kent_hand_lines(&p->derivation, KENT_SI) > 8);
    work_clear(&w);
}

static void the_tank_s_wall_takes_the_other_end(void **state)
{
    (void)state;
    work w = work_of(fused_to_iron(300.0));
    const kent_pull_end *p = end_at(&w, "R");
    assert_int_equal(p->holder, KENT_PULL_WALL);
    assert_true(says(&p->cautions, "the wall there must be made for"));
    work_clear(&w);
}

/* Where the size changes an anchor block stands, made for its own thrust alone. */
static void an_anchor_block_must_be_made_for_it_too(void **state)
{
    (void)state;
    kent_build b = fused_to_iron(300.0);
    b.model->pipes[1].outside_diameter = 0.40;
    b.model->pipes[1].inside_diameter = 0.38;
    work w = work_of(b);
    const kent_pull_end *p = end_at(&w, "P");
    assert_int_equal(p->holder, KENT_PULL_ANCHOR);
    assert_true(says(&p->cautions, "sized for its fitting's own thrust"));
    work_clear(&w);
}

/* Restrained joints beyond hold it over the length that friction needs. */
static void restrained_pipe_beyond_holds_it(void **state)
{
    (void)state;
    kent_build b = fused_to_iron(300.0);
    b.model->pipes[1].joint = KENT_RESTRAINED;
    work w = work_of(b);
    assert_int_equal(end_at(&w, "P")->holder, KENT_PULL_JOINTS);
    work_clear(&w);
}

/* Too short a pipe beyond does not. */
static void too_short_a_pipe_beyond_does_not(void **state)
{
    (void)state;
    kent_build b = fused_to_iron(300.0);
    b.model->pipes[1].joint = KENT_RESTRAINED;
    b.model->points[2].at.x = 302.0;
    work w = work_of(b);
    assert_int_equal(end_at(&w, "P")->holder, KENT_PULL_NOTHING);
    work_clear(&w);
}

/* A closed end stretches with p A more than the wall shortens: no more than cold pulls
 * there, and the string takes it. */
static void a_closed_end_holds_itself(void **state)
{
    (void)state;
    kent_build b = fused_to_iron(300.0);
    b.model->pipes[1].joint = KENT_FUSED;
    b.model->pipes[1].poisson = 0.45;
    b.model->pipes[1].modulus = 1e9;
    b.model->pipes[1].expansion = 0.0;
    work w = work_of(b);
    const kent_pull_end *p = end_at(&w, "E");
    assert_int_equal(p->holder, KENT_PULL_ITSELF);
    assert_within(p->pull, 0.0, 1e-9);
    assert_int_equal(p->cautions.count, 0);
    work_clear(&w);
}

static void what_is_missing_is_named(void **state)
{
    (void)state;
    kent_build b = fused_to_iron(300.0);
    b.model->loads.cooling = NAN;
    work w = work_of(b);
    assert_within(end_at(&w, "P")->of_cooling, 0.0, 0.0);
    assert_true(says(&end_at(&w, "P")->cautions, "give loads.cooling"));
    work_clear(&w);

    b = fused_to_iron(300.0);
    b.model->pipes[0].expansion = NAN;
    w = work_of(b);
    assert_true(says(&end_at(&w, "P")->cautions, "give its expansion"));
    work_clear(&w);

    b = fused_to_iron(300.0);
    b.model->pipes[0].long_modulus = NAN;
    w = work_of(b);
    assert_true(says(&end_at(&w, "P")->cautions, "no long_modulus"));
    work_clear(&w);

    b = fused_to_iron(300.0);
    b.model->pipes[0].poisson = NAN;
    w = work_of(b);
    assert_false(end_at(&w, "P")->known);
    assert_true(says(&end_at(&w, "P")->cautions, "give its poisson_ratio"));
    work_clear(&w);

    b = fused_to_iron(300.0);
    b.model->soils[0].friction_ratio = NAN;
    w = work_of(b);
    assert_true(isnan(end_at(&w, "P")->movement));
    assert_true(says(&end_at(&w, "P")->cautions, "friction on it is not known"));
    work_clear(&w);
}

/* R ===== P = E ----- F: fused, then `length` m bolted or welded of another pipe. */
static kent_build of_two_pipes(double string, double length, kent_joint joint)
{
    kent_build b = fused_to_iron(string);
    b.model->points[2].at.x = string + length;
    b.model->pipes[1].joint = joint;
    b.model->pipes[1].modulus = 170e9;
    b.model->pipes[1].poisson = 0.28;
    b.model->pipes[1].expansion = 11.2e-6;
    (void)kent_build_point(&b, "F", string + length + 500.0, 0.0, 0.0);
    const int next = kent_build_pipe(&b, "next", "E F", 0.43, 1000.0);
    b.model->pipes[next].material_density = 7050.0;
    return b;
}

/* By the balance of the step between the two bores and of the iron's end: two metres of
 * iron shorten by nothing, so that polyethylene pulls through them. */
static void a_yielding_pipe_pulls_through_a_stiff_one(void **state)
{
    (void)state;
    kent_build b = of_two_pipes(300.0, 2.0, KENT_FLANGED);
    b.model->loads.cooling = 0.0;
    work w = work_of(b);
    const kent_pull_end *p = end_at(&w, "E");
    const double pi_4 = 0.25 * PI, inside = OD - 2.0 * WALL;
    const double wall = 2.0 * 0.45 * 16e5 * pi_4 * inside * inside;
    const double iron = wall + 16e5 * pi_4 * (0.43 * 0.43 - inside * inside);
    const double pull = iron + 16e5 * pi_4 * (0.45 * 0.45 - 0.43 * 0.43);

    assert_close(p->pull, pull, 1e-9);
    assert_true(p->of_string > 0.2 * pull);
    assert_close(p->factored, 1.5 * pull, 1e-9);
    /* and it is polyethylene that moves, not iron: in years of 7.8 bar */
    const double lasts =
        w.net.model->water.density * w.net.model->gravity * 80.0 / 16e5 * pull;
    assert_string_equal(w.net.model->pipes[p->moving_pipe].id, "pe");
    assert_close(p->moving_pull, lasts, 1e-9);
    assert_close(p->movement,
                 lasts * lasts / (2.0 * p->friction * 200e6 * PI * (OD - WALL) * WALL),
                 1e-9);
    assert_true(kent_hand_lines(&p->derivation, KENT_SI) > 8);
    assert_true(kent_hand_lines(&p->derivation, KENT_US) > 8);
    /* at the other end the iron, which hardly yields, adds next to nothing */
    const kent_pull_end *other = end_at(&w, "R");
    assert_true(other->of_string < 1e-3 * other->pull);
    work_clear(&w);
}

/* Two kilometres of cold iron draw a short piece of polyethylene out at its end: what
 * both change in length adds up to nothing between the held ends. */
static void a_long_stiff_pipe_draws_a_short_yielding_one(void **state)
{
    (void)state;
    work w = work_of(of_two_pipes(50.0, 2000.0, KENT_WELDED));
    const kent_pull_end *p = end_at(&w, "R");
    const double pi_4 = 0.25 * PI, inside = OD - 2.0 * WALL;
    const double pressure =
        w.net.loads->strings.ends[p->end].cases[p->governing].pressure;
    const double soft = 1e9 * PI * (OD - WALL) * WALL;
    const double stiff = 170e9 * PI * 0.44 * 0.01;
    /* tension in either wall, from the end inwards */
    const double in_soft = p->pull - pressure * pi_4 * (OD * OD - inside * inside);
    const double in_stiff = in_soft + pressure * pi_4 * (0.43 * 0.43 - inside * inside);
    const double of_soft = 2.0 * 0.45 * pressure * pi_4 * inside * inside;
    const double of_stiff = 2.0 * 0.28 * pressure * pi_4 * 0.43 * 0.43;
    const double soft_moves = (in_soft - of_soft) / soft - 1.8e-4 * 15.0;
    const double stiff_moves = (in_stiff - of_stiff) / stiff - 11.2e-6 * 15.0;

    assert_true(p->of_string > 0.1 * p->pull);
    assert_close(50.0 * soft_moves, -2000.0 * stiff_moves, 1e-9);
    work_clear(&w);
}

static void a_pipe_of_a_string_that_is_not_known_is_named(void **state)
{
    (void)state;
    kent_build b = of_two_pipes(300.0, 2.0, KENT_FLANGED);
    b.model->pipes[0].poisson = NAN;
    work w = work_of(b);
    assert_true(says(&end_at(&w, "E")->cautions,
                     "leaves out pipe \"pe\" of the same string: give its "
                     "poisson_ratio"));
    work_clear(&w);
}

/* The string goes on through its bends, whose thrust its own wall carries. */
static void a_bend_within_a_string_needs_no_block(void **state)
{
    (void)state;
    kent_build b = fused_to_iron(300.0);
    b.model->points[1].at = (kent_vec3){300.0, 300.0, 0.0};
    b.model->points[2].at = (kent_vec3){300.0, 800.0, 0.0};
    (void)kent_build_point(&b, "B", 300.0, 0.0, 0.0);
    const int route[] = {0, 3, 1, 1, 2};
    int *at = realloc(b.model->route, sizeof route);
    assert_non_null(at);
    memcpy(at, route, sizeof route);
    b.model->route = at;
    b.model->route_count = 5;
    b.model->pipes[0].route_count = 3;
    b.model->pipes[1].route_first = 3;
    work w = work_of(b);
    const kent_holding *h = &w.r->fittings[kent_build_fitting_of(&w.net.build, "B")];
    assert_int_equal(h->chosen, KENT_RESTRAINED_JOINTS);
    assert_int_equal(h->block.type, KENT_BLOCK_NONE);
    assert_int_equal(w.r->pulls.end_count, 2);
    assert_close(w.net.loads->strings.length[0], 600.0, 1e-12);
    work_clear(&w);
}

static int size_once(void *context)
{
    const work *w = context;
    kent_restraints *r = NULL;
    kent_error err = {0};
    const kent_status status =
        kent_restraint_size(w->net.model, w->net.loads, &r, &err);

    kent_restraints_free(r);
    assert_true(status == KENT_OK || (status == KENT_E_NOMEM && r == NULL));
    return status != KENT_OK;
}

static void every_refused_allocation_is_reported(void **state)
{
    (void)state;
    kent_build b = fused_to_iron(300.0);
    b.model->points[0].at.z = 70.0; /* and steep */
    work w = work_of(b);
    assert_int_equal(w.r->pulls.steep_count, 1);
    assert_true(kent_allocations_needed(size_once, &w) > 20);
    work_clear(&w);
}

/* ---- behind restrained joints ---------------------------------------------------- */

/* R - B - E, a right angle held by restrained joints, 16 bar of test. */
static kent_build restrained_bend(void)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    (void)kent_build_point(&b, "B", 500.0, 0.0, 0.0);
    (void)kent_build_point(&b, "E", 500.0, 500.0, 0.0);
    const int p = kent_build_pipe(&b, "A", "R B E", 0.3, 1000.0);
    b.model->pipes[p].material_density = 7050.0;
    (void)kent_build_fixed_level(&b, "R", 80.0);
    const int note = kent_build_note(&b, "B");
    b.model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
    sand(&b);
    b.model->loads.test_pressure = 16e5;
    return b;
}

/* p A over the area of the wall: 0.32 m outside, 10 mm thick. */
static void thrust_leaves_a_stress_along_the_wall(void **state)
{
    (void)state;
    work w = work_of(restrained_bend());
    const int bend = kent_build_fitting_of(&w.net.build, "B");
    const double pull = 16e5 * 0.25 * PI * 0.32 * 0.32;
    size_t found = 0;
    for (size_t i = 0; i < w.r->pulls.leg_count; i++) {
        const kent_pull_leg *leg = &w.r->pulls.legs[i];
        if (leg->fitting != (size_t)bend) continue;
        assert_close(leg->pull, pull, 1e-9);
        assert_close(leg->stress, pull / (PI * 0.31 * 0.01), 1e-9);
        found++;
    }
    assert_int_equal(found, 2);
    assert_non_null(kent_derivation_find(&w.r->fittings[bend].derivation, "sw"));
    assert_true(kent_hand_lines(&w.r->fittings[bend].derivation, KENT_SI) > 8);
    work_clear(&w);
}

static void joints_and_pipes_must_be_rated(void **state)
{
    (void)state;
    kent_build b = restrained_bend();
    work w = work_of(b);
    const kent_holding *h = &w.r->fittings[kent_build_fitting_of(&w.net.build, "B")];
    assert_true(kent_hand_says(h, "give its joint_rating"));
    work_clear(&w);

    b = restrained_bend();
    b.model->pipes[0].joint_rating = 12e5;
    b.model->pipes[0].pressure_rating = 25e5;
    b.model->pipes[0].test_rating = 10e5;
    w = work_of(b);
    h = &w.r->fittings[kent_build_fitting_of(&w.net.build, "B")];
    assert_true(kent_hand_says(h, "the restrained joints of pipe \"A\" are rated for"));
    assert_true(kent_hand_says(h, "the walls of pipe \"A\" are rated for"));
    work_clear(&w);

    b = restrained_bend();
    b.model->pipes[0].joint_rating = 16e5;
    b.model->pipes[0].pressure_rating = 16e5;
    w = work_of(b);
    h = &w.r->fittings[kent_build_fitting_of(&w.net.build, "B")];
    assert_false(kent_hand_says(h, "rated for 1"));
    assert_false(kent_hand_says(h, "joint_rating"));
    work_clear(&w);
}

/* The test governs by its factor; still water, with less of one, presses more. */
static void ratings_are_held_against_every_case(void **state)
{
    (void)state;
    kent_build b = restrained_bend();
    b.model->fixed_levels[0].level = 150.0; /* 14.7 bar */
    b.model->loads.test_pressure = 12e5;
    b.model->loads.factor[KENT_CASE_TEST] = 3.0;
    b.model->loads.factor[KENT_CASE_STATIC] = 1.0;
    b.model->loads.factor[KENT_CASE_STEADY] = 1.0;
    b.model->pipes[0].joint_rating = 13e5;
    b.model->pipes[0].pressure_rating = 14e5;
    b.model->pipes[0].test_rating = 13e5;
    work w = work_of(b);
    const kent_holding *h = &w.r->fittings[kent_build_fitting_of(&w.net.build, "B")];
    const kent_fitting_loads *loads =
        &w.net.loads->fittings[kent_build_fitting_of(&w.net.build, "B")];
    assert_string_equal(loads->cases[h->governing].name, "test");
    assert_true(kent_hand_says(h, "the restrained joints of pipe \"A\" are rated for "
                                  "13.00 bar, and 'static' brings 14.7"));
    assert_true(kent_hand_says(h, "the walls of pipe \"A\" are rated for 14.00 bar, "
                                  "and 'static' brings 14.7"));
    work_clear(&w);

    b = restrained_bend();
    b.model->fixed_levels[0].level = 150.0;
    b.model->loads.test_pressure = 12e5;
    b.model->loads.factor[KENT_CASE_TEST] = 3.0;
    w = work_of(b);
    h = &w.r->fittings[kent_build_fitting_of(&w.net.build, "B")];
    assert_true(kent_hand_says(h, "the restrained joints of pipe \"A\", which must "
                                  "carry 14.7"));
    work_clear(&w);
}

/* A fused or welded joint is as strong as its pipe: it has no rating of its own. */
static void welds_need_no_rating_of_their_own(void **state)
{
    (void)state;
    kent_build b = restrained_bend();
    b.model->pipes[0].joint = KENT_WELDED;
    work w = work_of(b);
    const kent_holding *h = &w.r->fittings[kent_build_fitting_of(&w.net.build, "B")];
    assert_false(kent_hand_says(h, "joint_rating"));
    assert_true(kent_hand_says(h, "give its pressure_rating"));
    work_clear(&w);
}

/* The leg beyond B runs on into a pipe of the same size made for less. */
static void every_pipe_along_a_leg_must_be_rated(void **state)
{
    (void)state;
    kent_build b = restrained_bend();
    (void)kent_build_point(&b, "F", 500.0, 900.0, 0.0);
    b.model->points[2].at.y = 2.0;
    const int next = kent_build_pipe(&b, "N", "E F", 0.3, 1000.0);
    b.model->pipes[next].material_density = 7050.0;
    b.model->pipes[next].joint_rating = 10e5;
    b.model->pipes[next].pressure_rating = 25e5;
    b.model->pipes[0].joint_rating = 25e5;
    b.model->pipes[0].pressure_rating = 25e5;
    work w = work_of(b);
    const kent_holding *h = &w.r->fittings[kent_build_fitting_of(&w.net.build, "B")];
    assert_true(kent_hand_says(h, "the restrained joints of pipe \"N\" are rated for"));
    assert_false(kent_hand_says(h, "pipe \"A\" are rated for"));
    work_clear(&w);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(pressure_pulls_as_a_thick_wall_does),
        cmocka_unit_test(the_handbook_has_the_mean_diameter),
        cmocka_unit_test(rubber_pulls_with_the_whole_outside),
        cmocka_unit_test(what_is_taken_is_never_below_the_handbook),
        cmocka_unit_test(cooling_pulls_by_modulus_and_wall),
        cmocka_unit_test(movement_is_strain_added_up),
        cmocka_unit_test(length_counts_only_up_to_twice_the_development),
        cmocka_unit_test(an_end_at_slipping_joints_must_be_held),
        cmocka_unit_test(the_length_of_a_string_is_no_part_of_its_pull),
        cmocka_unit_test(what_lasts_may_move_it_further_than_it_pulls),
        cmocka_unit_test(the_tank_s_wall_takes_the_other_end),
        cmocka_unit_test(an_anchor_block_must_be_made_for_it_too),
        cmocka_unit_test(restrained_pipe_beyond_holds_it),
        cmocka_unit_test(too_short_a_pipe_beyond_does_not),
        cmocka_unit_test(a_closed_end_holds_itself),
        cmocka_unit_test(what_is_missing_is_named),
        cmocka_unit_test(a_yielding_pipe_pulls_through_a_stiff_one),
        cmocka_unit_test(a_long_stiff_pipe_draws_a_short_yielding_one),
        cmocka_unit_test(a_pipe_of_a_string_that_is_not_known_is_named),
        cmocka_unit_test(a_bend_within_a_string_needs_no_block),
        cmocka_unit_test(every_refused_allocation_is_reported),
        cmocka_unit_test(thrust_leaves_a_stress_along_the_wall),
        cmocka_unit_test(joints_and_pipes_must_be_rated),
        cmocka_unit_test(ratings_are_held_against_every_case),
        cmocka_unit_test(welds_need_no_rating_of_their_own),
        cmocka_unit_test(every_pipe_along_a_leg_must_be_rated),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
