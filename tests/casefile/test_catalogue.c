/* config/ against the standards it was taken from. */
#include "case_text.h"

#include <math.h>

static const double MM = 0.001;  /* m */
static const double IN = 0.0254; /* m */
static const double PSF =
    47.880258980335843; /* Pa: 4.4482216152605 N / 0.09290304 m2 */

/* EN 545:2010, outside diameters by DN. */
static void ductile_iron_of_en_545_has_the_standards_diameters(void **state)
{
    (void)state;
    static const double SIZES[][2] = {{80, 98},   {100, 118}, {125, 144},  {150, 170},
                                      {200, 222}, {250, 274}, {300, 326},  {350, 378},
                                      {400, 429}, {500, 532}, {600, 635},  {700, 738},
                                      {800, 842}, {900, 945}, {1000, 1048}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof SIZES / sizeof SIZES[0]; i++) {
        char id[KENT_ID];
        (void)snprintf(id, sizeof id, "DI-EN545-C40-DN%g", SIZES[i][0]);
        const kent_pipe_class *p = kent_catalogue_pipe(c, id);
        assert_non_null(p);
        assert_close(p->outside_diameter, SIZES[i][1] * MM, 1e-12);
    }
    kent_catalogue_free(c);
}

/* EN 545:2010: walls are minima; nominal = minimum + 1.3 mm + 0.001 DN, from memory. */
static void walls_of_en_545_are_minima_and_the_nominal_ones_are_thicker(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    const kent_pipe_class *p = kent_catalogue_pipe(c, "DI-EN545-C30-DN600");
    assert_non_null(p);
    assert_close(p->wall_minimum, 6.7 * MM, 1e-12);
    assert_close(p->wall, (6.7 + 1.3 + 0.6) * MM, 1e-12);
    assert_close(p->pressure_rating, 30e5, 1e-12);
    assert_string_equal(p->material, "ductile-iron");
    assert_null(kent_catalogue_pipe(c, "DI-EN545-C30-DN300")); /* not made */
    for (size_t i = 0; i < c->pipe_count; i++) {
        const kent_pipe_class *q = &c->pipes[i];
        assert_true(isnan(q->wall_minimum) || q->wall > q->wall_minimum);
        assert_true(q->outside_diameter > 2.0 * (q->wall + q->lining));
        assert_non_null(kent_catalogue_material(c, q->material));
    }
    kent_catalogue_free(c);
}

/* AWWA C151, outside diameters and special thickness classes 50 and 56; 54 in is that
 * of the tables since 1991. */
static void
ductile_iron_of_awwa_c151_has_the_standards_diameters_and_walls(void **state)
{
    (void)state;
    static const double ROWS[][4] = {
        /* size, outside, class 51, class 56; in */
        {4, 4.80, 0.26, 0.41},   {6, 6.90, 0.28, 0.43},   {8, 9.05, 0.30, 0.45},
        {10, 11.10, 0.32, 0.47}, {12, 13.20, 0.34, 0.49}, {14, 15.30, 0.36, 0.51},
        {16, 17.40, 0.37, 0.52}, {18, 19.50, 0.38, 0.53}, {20, 21.60, 0.39, 0.54},
        {24, 25.80, 0.41, 0.56}, {30, 32.00, 0.43, 0.63}, {36, 38.30, 0.48, 0.73},
        {42, 44.50, 0.53, 0.83}, {48, 50.80, 0.58, 0.93}, {54, 57.56, 0.65, 1.05}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char id[KENT_ID];
        (void)snprintf(id, sizeof id, "DI-C151-TC51-%gin", ROWS[i][0]);
        const kent_pipe_class *thin = kent_catalogue_pipe(c, id);
        (void)snprintf(id, sizeof id, "DI-C151-TC56-%gin", ROWS[i][0]);
        const kent_pipe_class *thick = kent_catalogue_pipe(c, id);
        assert_non_null(thin);
        assert_non_null(thick);
        assert_close(thin->outside_diameter, ROWS[i][1] * IN, 1e-12);
        assert_close(thin->wall, ROWS[i][2] * IN, 1e-12);
        assert_close(thick->wall, ROWS[i][3] * IN, 1e-12);
    }
    kent_catalogue_free(c);
}

/* AWWA C150/C151: published walls of pressure classes, 12, 24 and 48 in class 350 and
 * 54, 60 and 64 in class 150 and 350; 42 in class 300 by the formula (one published
 * table misprints it). */
static void pressure_classes_of_awwa_c151_have_the_published_walls(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double wall; /* in */
    } ROWS[] = {{"DI-C151-PC350-12in", 0.28}, {"DI-C151-PC350-24in", 0.43},
                {"DI-C151-PC350-48in", 0.70}, {"DI-C151-PC300-42in", 0.57},
                {"DI-C151-PC150-54in", 0.51}, {"DI-C151-PC350-54in", 0.79},
                {"DI-C151-PC150-60in", 0.54}, {"DI-C151-PC350-60in", 0.83},
                {"DI-C151-PC150-64in", 0.56}, {"DI-C151-PC350-64in", 0.87}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_pipe_class *p = kent_catalogue_pipe(c, ROWS[i].id);
        assert_non_null(p);
        assert_close(p->wall, ROWS[i].wall * IN, 1e-12);
    }
    kent_catalogue_free(c);
}

/* AWWA C150: t = 2 (P + 100 psi) D/(2 x 42 000 psi) + 0.08 in + casting tolerance, at
 * least 0.25 in, to 0.01 in (the tolerances from memory). */
static void walls_of_pressure_classes_follow_the_formula_of_awwa_c150(void **state)
{
    (void)state;
    static const double ROWS[][3] = {
        /* size, outside, casting tolerance; in */
        {3, 3.96, .05},   {4, 4.80, .05},   {6, 6.90, .05},   {8, 9.05, .05},
        {10, 11.10, .06}, {12, 13.20, .06}, {14, 15.30, .07}, {16, 17.40, .07},
        {18, 19.50, .07}, {20, 21.60, .07}, {24, 25.80, .07}, {30, 32.00, .07},
        {36, 38.30, .07}, {42, 44.50, .07}, {48, 50.80, .08}, {54, 57.56, .09},
        {60, 61.61, .09}, {64, 65.67, .09}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        for (int psi = 150; psi <= 350; psi += 50) {
            char id[KENT_ID];
            (void)snprintf(id, sizeof id, "DI-C151-PC%d-%gin", psi, ROWS[i][0]);
            const kent_pipe_class *p = kent_catalogue_pipe(c, id);
            assert_non_null(p);
            const double wall =
                (psi + 100.0) * ROWS[i][1] / 42000.0 + 0.08 + ROWS[i][2];
            assert_close(p->outside_diameter, ROWS[i][1] * IN, 1e-12);
            assert_within(p->wall / IN, fmax(wall, 0.25), 0.00501);
            assert_close(p->pressure_rating, psi * 6894.757293168, 1e-12);
        }
    }
    kent_catalogue_free(c);
}

/* EN 545:2010, preferred classes (from memory): e = C (OD - e) 3/(20 x 420), mm and
 * bar, to 0.1 mm, and no less than 3.0, 3.5, 4.0 and 4.7 mm. */
static void walls_of_en_545_follow_from_the_class(void **state)
{
    (void)state;
    static const double SIZES[] = {80,  100, 125, 150, 200, 250, 300, 350,
                                   400, 500, 600, 700, 800, 900, 1000};
    static const double CLASSES[][2] = {{40, 3.0}, {50, 3.5}, {64, 4.0}, {100, 4.7}};
    kent_catalogue *c = read_catalogue();
    size_t found = 0;
    for (size_t i = 0; i < sizeof SIZES / sizeof SIZES[0]; i++) {
        for (size_t k = 0; k < sizeof CLASSES / sizeof CLASSES[0]; k++) {
            char id[KENT_ID];
            const double class_of = CLASSES[k][0]; /* bar */
            (void)snprintf(id, sizeof id, "DI-EN545-C%g-DN%g", class_of, SIZES[i]);
            const kent_pipe_class *p = kent_catalogue_pipe(c, id);
            if (!p) continue; /* not made */
            const double share = class_of * 3.0 / (20.0 * 420.0);
            const double wall = share * p->outside_diameter / MM / (1.0 + share);
            assert_within(p->wall_minimum / MM, fmax(wall, CLASSES[k][1]), 0.06);
            assert_close(p->wall, p->wall_minimum + 1.3 * MM + 0.001 * SIZES[i] * MM,
                         1e-12);
            assert_close(p->pressure_rating, class_of * 1e5, 1e-12);
            found++;
        }
    }
    assert_int_equal(found, 54);
    kent_catalogue_free(c);
}

/* NFPA 24, annex A: horizontal bearing strengths, psf. */
static void soils_have_the_bearings_of_their_one_table(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double bearing; /* psf */
    } ROWS[] = {{"peat-PT", 0.0},        {"soft-clay-CH", 1000.0},
                {"silt-ML", 1500.0},     {"sandy-silt-SM", 3000.0},
                {"sand-SP", 4000.0},     {"sandy-clay-SC", 6000.0},
                {"hard-clay-CL", 9000.0}};
    kent_catalogue *c = read_catalogue();
    assert_int_equal(c->soil_count, sizeof ROWS / sizeof ROWS[0]);
    for (size_t i = 0; i < c->soil_count; i++) {
        const kent_soil *s = &c->soils[i];
        assert_string_equal(s->id, ROWS[i].id);
        assert_within(s->allowable_bearing, ROWS[i].bearing * PSF, 1e-6);
        assert_int_equal(s->unreliable, ROWS[i].bearing <= 0.0);
        assert_true(isnan(s->friction_ratio) && isnan(s->adhesion_ratio) &&
                    isnan(s->passive_ratio)); /* disputed: stated by the case or not */
    }
    kent_catalogue_free(c);
}

static void valves_pass_less_the_less_they_are_open(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    assert_true(c->valve_count >= 4);
    for (size_t i = 0; i < c->valve_count; i++) {
        const kent_valve_type *v = &c->valves[i];
        double before = 0.0;
        for (int k = 0; k <= 100; k++) {
            const double now = kent_valve_relative_capacity(&v->curve, 0.01 * k);
            assert_true(now >= before && now <= 1.0);
            before = now;
        }
        assert_close(before, 1.0, 1e-12);
        assert_true(v->loss > 0.0);
    }
    assert_non_null(kent_catalogue_valve(c, "butterfly"));
    kent_catalogue_free(c);
}

/* From the loss table itself: at 40 deg from open K = 10.8 against 0.24 at 5 deg. */
static void a_butterfly_valves_capacity_follows_from_its_loss(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    const kent_valve_type *v = kent_catalogue_valve(c, "butterfly");
    const double got = kent_valve_relative_capacity(&v->curve, 0.5556);
    assert_close(got, sqrt(0.24 / 10.8), 1e-6);
    kent_catalogue_free(c);
}

/* Fittings-loss table of a chemical engineers' handbook, seen in reproduction: gate and
 * globe by lift, plug by its angle from open. */
static void valves_lose_what_the_table_of_losses_says(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double opening, loss, open_loss;
    } ROWS[] = {{"gate", 0.75, 0.9, 0.17},         {"gate", 0.50, 4.5, 0.17},
                {"gate", 0.25, 24.0, 0.17},        {"globe", 0.75, 13.0, 9.0},
                {"globe", 0.50, 36.0, 9.0},        {"globe", 0.25, 112.0, 9.0},
                {"plug", 0.8889, 0.29, 0.05},      {"plug", 0.7778, 1.56, 0.05},
                {"plug", 0.5556, 17.3, 0.05},      {"plug", 0.3333, 206.0, 0.05},
                {"butterfly", 0.8889, 0.52, 0.24}, {"butterfly", 0.7778, 1.54, 0.24},
                {"butterfly", 0.3333, 118.0, 0.24}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_valve_type *v = kent_catalogue_valve(c, ROWS[i].id);
        assert_non_null(v);
        assert_close(v->loss, ROWS[i].open_loss, 1e-12);
        assert_close(kent_valve_relative_capacity(&v->curve, ROWS[i].opening),
                     sqrt(ROWS[i].open_loss / ROWS[i].loss), 1e-12);
    }
    kent_catalogue_free(c);
}

/* Usual textbook values, short-term (from memory). */
static void materials_have_the_usual_moduli(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double modulus, poisson; /* GPa, - */
    } ROWS[] = {{"ductile-iron", 170, 0.28}, {"grey-iron", 100, 0.25},
                {"steel", 207, 0.30},        {"PVC-U", 3, 0.40},
                {"PE100", 1, 0.45},          {"concrete", 30, 0.20}};
    kent_catalogue *c = read_catalogue();
    assert_int_equal(c->material_count, sizeof ROWS / sizeof ROWS[0]);
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_material *m = kent_catalogue_material(c, ROWS[i].id);
        assert_non_null(m);
        assert_close(m->modulus, ROWS[i].modulus * 1e9, 1e-12);
        assert_close(m->poisson, ROWS[i].poisson, 1e-12);
    }
    kent_catalogue_free(c);
}

/* Common practice, no source, but for the factor and the share of sleeved pipes (NFPA
 * 24, iron-pipe handbooks; from memory). In both systems. */
static void design_rules_are_those_of_common_practice(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    assert_int_equal(c->rule_count, 2);
    for (size_t i = 0; i < 2; i++) {
        const kent_rules *r = &c->rules[i];
        assert_close(r->safety_factor, 1.5, 1e-12);
        assert_close(r->height_to_depth, 0.5, 1e-12);
        assert_close(r->width_to_height[0], 1.0, 1e-12);
        assert_close(r->width_to_height[1], 2.0, 1e-12);
        assert_close(r->wrapped_ratio, 0.7, 1e-12);
        assert_close(r->least_height, 0.3, 0.02);
        assert_close(r->least_thickness, 0.45, 0.02);
        assert_close(r->least_cover, 0.6, 0.02);
        assert_close(r->concrete_unit_weight, 23.5e3, 0.01);
        assert_close(r->water_unit_weight, 9.81e3, 0.001);
        assert_close(r->largest_volume, 60.0, 0.05);
    }
    kent_catalogue_free(c);
}

static void every_row_says_where_it_comes_from(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < c->pipe_count; i++) {
        assert_true(c->pipes[i].from.source[0] != '\0');
        assert_true(c->pipes[i].from.status[0] != '\0');
    }
    for (size_t i = 0; i < c->material_count; i++) {
        assert_true(c->materials[i].from.source[0] != '\0');
        assert_true(c->materials[i].from.status[0] != '\0');
    }
    for (size_t i = 0; i < c->valve_count; i++) {
        assert_true(c->valves[i].from.source[0] != '\0');
        assert_true(c->valves[i].from.status[0] != '\0');
    }
    for (size_t i = 0; i < c->soil_count; i++) {
        assert_non_null(strstr(c->soils[i].source, "NFPA 24"));
    }
    assert_true(c->rule_count >= 1);
    assert_non_null(strstr(c->rules[0].source, "common practice"));
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(ductile_iron_of_en_545_has_the_standards_diameters),
        cmocka_unit_test(walls_of_en_545_are_minima_and_the_nominal_ones_are_thicker),
        cmocka_unit_test(
            ductile_iron_of_awwa_c151_has_the_standards_diameters_and_walls),
        cmocka_unit_test(pressure_classes_of_awwa_c151_have_the_published_walls),
        cmocka_unit_test(walls_of_pressure_classes_follow_the_formula_of_awwa_c150),
        cmocka_unit_test(walls_of_en_545_follow_from_the_class),
        cmocka_unit_test(soils_have_the_bearings_of_their_one_table),
        cmocka_unit_test(valves_lose_what_the_table_of_losses_says),
        cmocka_unit_test(materials_have_the_usual_moduli),
        cmocka_unit_test(design_rules_are_those_of_common_practice),
        cmocka_unit_test(valves_pass_less_the_less_they_are_open),
        cmocka_unit_test(a_butterfly_valves_capacity_follows_from_its_loss),
        cmocka_unit_test(every_row_says_where_it_comes_from),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
