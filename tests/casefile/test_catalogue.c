/* config/ against the standards it was taken from. */
#include "case_text.h"

#include <math.h>

static const double PSF =
    47.880258980335843; /* Pa: 4.4482216152605 N / 0.09290304 m2 */

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
        cmocka_unit_test(soils_have_the_bearings_of_their_one_table),
        cmocka_unit_test(valves_lose_what_the_table_of_losses_says),
        cmocka_unit_test(design_rules_are_those_of_common_practice),
        cmocka_unit_test(valves_pass_less_the_less_they_are_open),
        cmocka_unit_test(a_butterfly_valves_capacity_follows_from_its_loss),
        cmocka_unit_test(every_row_says_where_it_comes_from),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
