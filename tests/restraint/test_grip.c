/* Friction and bearing of soil on a pipe, and the lengths that follow. */
#include "kent_check.h"
#include "kent_restraint.h"

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */
static const double INCH = 0.0254;                           /* m */
static const double FOOT = 0.3048;                           /* m */
static const double POUND = 4.4482216152605;                 /* N */

/* The iron-pipe handbook's form of restrained length, from memory (its structure is
 * confirmed by USACE ETL 1110-3-446, 1992); every input stated, every answer worked out
 * from the formulas: ductile iron 0.2547 lb/in3, water 62.4 lb/ft3, no lining. */
typedef struct row {
    double outside, wall; /* in */
    double psi, turn, cover;
    double phi, f_phi, cohesion, f_c, weight, kn; /* deg, -, psf, -, pcf, - */
    double friction, bearing;                     /* lb/ft */
    double bend, no_bearing, end, sleeved;        /* ft at a factor of 1.5 */
} row;

static const row ROWS[] = {
    {13.20, 0.28, 150, 90, 4, 30, .75, 0, 0, 90, 1.0, 364.97, 1351.35, 29.59, 84.37,
     84.37, 33.07},
    {13.20, 0.28, 150, 45, 4, 30, .75, 0, 0, 90, .85, 364.97, 1148.65, 13.58, 34.95,
     84.37, 15.37},
    {9.05, 0.25, 200, 90, 3, 29, .75, 0, 0, 90, .85, 180.83, 561.53, 41.81, 106.72,
     106.72, 47.37},
    {13.20, 0.28, 150, 90, 4, 0, 0, 450, .80, 90, .40, 622.04, 576.18, 33.83, 49.50,
     24.75, 42.56},
    {25.80, 0.30, 150, 22.5, 5, 36, .75, 0, 0, 100, .85, 1243.03, 4276.34, 6.92, 18.82,
     94.63, 7.78},
};

static kent_trench trench_of(const row *r)
{
    const double bore = r->outside - 2.0 * r->wall;
    const double iron =
        PI * (r->outside - r->wall) * r->wall * 0.2547 * 12.0; /* lb/ft */
    const double water = 62.4 * 0.25 * PI * bore * bore / 144.0;

    return (kent_trench){
        .outside_diameter = r->outside * INCH,
        .cover = r->cover * FOOT,
        .pipe_weight = iron * POUND / FOOT,
        .water_weight = water * POUND / FOOT,
        .unit_weight = r->weight * POUND / (FOOT * FOOT * FOOT),
        .friction_angle = r->phi * DEGREE,
        .cohesion = r->cohesion * POUND / (FOOT * FOOT),
        .friction_ratio = r->f_phi,
        .adhesion_ratio = r->f_c,
        .passive_ratio = r->kn,
    };
}

static double pull_of(const row *r) /* N, pressure x area */
{
    return r->psi * 0.25 * PI * r->outside * r->outside * POUND;
}

static void friction_and_bearing_follow_the_handbook_s_form(void **state)
{
    (void)state;
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_trench t = trench_of(&ROWS[i]);
        const kent_soil_grip grip = kent_soil_grip_of(&t);
        assert_close(grip.friction * FOOT / POUND, ROWS[i].friction, 2e-3);
        assert_close(grip.bearing * FOOT / POUND, ROWS[i].bearing, 2e-3);
    }
}

static void
lengths_of_bends_ends_and_sleeved_pipes_follow_the_handbook_s_form(void **state)
{
    (void)state;
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const row *r = &ROWS[i];
        const kent_trench t = trench_of(r);
        const kent_soil_grip g = kent_soil_grip_of(&t);
        const double pull = pull_of(r), turn = r->turn * DEGREE;
        const double fs = g.friction, rs = g.bearing;

        assert_close(kent_restrained_length_bend(pull, turn, 1.5, fs, rs) / FOOT,
                     r->bend, 2e-3);
        assert_close(kent_restrained_length_bend(pull, turn, 1.5, fs, 0.0) / FOOT,
                     r->no_bearing, 2e-3);
        assert_close(kent_restrained_length_bend(pull, turn, 1.5, 0.7 * fs, rs) / FOOT,
                     r->sleeved, 2e-3);
        assert_close(kent_restrained_length_end(pull, 1.5, g.friction_whole) / FOOT,
                     r->end, 2e-3);
    }
}

/* From the row of clay: 622.04 lb/ft on half the perimeter, 1244.07 on the whole. */
static void adhesion_counts_on_half_the_perimeter_at_bends_only(void **state)
{
    (void)state;
    const kent_trench t = trench_of(&ROWS[3]);
    const kent_soil_grip grip = kent_soil_grip_of(&t);

    assert_close(grip.friction_whole * FOOT / POUND, 1244.07, 2e-3);
    assert_close(grip.friction_whole, 2.0 * grip.friction, 1e-12);
}

static void without_cohesion_the_perimeter_does_not_matter(void **state)
{
    (void)state;
    const kent_trench t = trench_of(&ROWS[0]);
    const kent_soil_grip grip = kent_soil_grip_of(&t);
    assert_close(grip.friction_whole, grip.friction, 1e-14);
}

static void deeper_cover_never_lengthens_a_restrained_run(void **state)
{
    (void)state;
    kent_trench t = trench_of(&ROWS[2]);
    double last = INFINITY;

    for (int i = 1; i <= 40; i++) {
        t.cover = 0.1 * i;
        const kent_soil_grip g = kent_soil_grip_of(&t);
        const double length = kent_restrained_length_bend(pull_of(&ROWS[2]), 0.5, 1.5,
                                                          g.friction, g.bearing);
        assert_true(length < last);
        last = length;
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(friction_and_bearing_follow_the_handbook_s_form),
        cmocka_unit_test(
            lengths_of_bends_ends_and_sleeved_pipes_follow_the_handbook_s_form),
        cmocka_unit_test(adhesion_counts_on_half_the_perimeter_at_bends_only),
        cmocka_unit_test(without_cohesion_the_perimeter_does_not_matter),
        cmocka_unit_test(deeper_cover_never_lengthens_a_restrained_run),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
