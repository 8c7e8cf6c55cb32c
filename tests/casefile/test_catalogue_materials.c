/* config/materials.cfg against handbooks and standards; what is from memory says so. */
#include "case_text.h"

#include <math.h>

static const kent_material *sure_material(const kent_catalogue *c, const char *id)
{
    const kent_material *m = kent_catalogue_material(c, id);
    assert_non_null(m);
    return m;
}

/* Usual textbook values, short-term (from memory); PVC 12454 400 ksi (AWWA M23) and
 * PE4710 150 ksi (AWWA M55), from memory. */
static void materials_have_the_usual_values(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double modulus, poisson, density, roughness; /* GPa, -, kg/m3, mm */
        bool plastic;
    } ROWS[] = {{"ductile-iron", 170, 0.28, 7050, 0.1, false},
                {"grey-iron", 100, 0.25, 7200, 0.25, false},
                {"steel", 207, 0.30, 7850, 0.1, false},
                {"PVC-U", 3, 0.40, 1400, 0.01, true},
                {"PVC-12454", 2.757903, 0.40, 1400, 0.01, true},
                {"PE100", 1, 0.45, 955, 0.01, true},
                {"PE4710", 1.034214, 0.45, 960, 0.01, true},
                {"asbestos-cement", 24, 0.20, 2000, 0.1, false},
                {"concrete", 30, 0.20, 2400, 0.3, false}};
    kent_catalogue *c = read_catalogue();
    assert_int_equal(c->material_count, sizeof ROWS / sizeof ROWS[0]);
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_material *m = sure_material(c, ROWS[i].id);
        assert_close(m->modulus, ROWS[i].modulus * 1e9, 1e-6);
        assert_close(m->poisson, ROWS[i].poisson, 1e-12);
        assert_close(m->density, ROWS[i].density, 1e-12);
        assert_close(m->roughness, ROWS[i].roughness * 1e-3, 1e-12);
        assert_int_equal(m->plastic, ROWS[i].plastic);
        const bool mortar = i < 3; /* iron and steel, lined */
        assert_within(m->lining_modulus, mortar ? 25e9 : 0.0, 1.0);
        assert_int_equal(m->creep_count > 0, ROWS[i].plastic);
        assert_int_equal(m->derating_count > 0, ROWS[i].plastic);
        assert_true(m->from.source[0] != '\0' && m->from.status[0] != '\0');
    }
    kent_catalogue_free(c);
}

/* De-rating by temperature, all from memory: AWWA C900 and M23 (PVC, degF), EN ISO
 * 1452-2 (PVC-U, between 25 and 45 degC), EN 12201-1 and ISO 4427-1 (PE100), AWWA M55
 * (PE4710, degF). */
static void plastics_are_weaker_when_warm(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double kelvin, factor;
    } ROWS[] = {{"PVC-U", 298.15, 1.0},
                {"PVC-U", 308.15, 0.815},
                {"PVC-U", 318.15, 0.63},
                {"PVC-12454", 296.15, 1.0},             /* 73.4 degF */
                {"PVC-12454", 299.81666666666666, .88}, /* 80 */
                {"PVC-12454", 305.37222222222222, .75}, /* 90 */
                {"PVC-12454", 310.92777777777778, .62}, /* 100 */
                {"PVC-12454", 316.48333333333333, .50}, /* 110 */
                {"PVC-12454", 322.03888888888889, .40}, /* 120 */
                {"PVC-12454", 327.59444444444444, .30}, /* 130 */
                {"PVC-12454", 333.14, .22},             /* 140, a little less */
                {"PE100", 293.15, 1.0},
                {"PE100", 303.15, 0.87},
                {"PE100", 308.15, 0.805},
                {"PE100", 313.15, 0.74},
                {"PE4710", 299.81666666666666, 1.0},
                {"PE4710", 305.37222222222222, 0.9},
                {"PE4710", 310.92, 0.8},
                {"ductile-iron", 333.15, 1.0}};
    static const struct {
        const char *id;
        double kelvin; /* too warm */
    } HOT[] = {
        {"PVC-U", 318.25}, {"PVC-12454", 333.25}, {"PE100", 313.25}, {"PE4710", 311.0}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        assert_within(
            kent_material_derating(sure_material(c, ROWS[i].id), ROWS[i].kelvin),
            ROWS[i].factor, 2e-4);
    }
    static const struct {
        const char *id;
        double kelvin; /* up to which ratings hold whole */
    } WHOLE[] = {{"PVC-U", 298.15},
                 {"PVC-12454", 296.15},
                 {"PE100", 293.15},
                 {"PE4710", 299.81666666666666}};
    for (size_t i = 0; i < sizeof WHOLE / sizeof WHOLE[0]; i++) {
        const kent_material *m = sure_material(c, WHOLE[i].id);
        assert_close(kent_material_derating(m, WHOLE[i].kelvin - 0.01), 1.0, 1e-12);
        assert_true(kent_material_derating(m, WHOLE[i].kelvin + 0.01) < 1.0);
    }
    for (size_t i = 0; i < sizeof HOT / sizeof HOT[0]; i++) {
        assert_true(
            isnan(kent_material_derating(sure_material(c, HOT[i].id), HOT[i].kelvin)));
    }
    kent_catalogue_free(c);
}

/* Covas et al., Journal of Hydraulic Research 2004 and 2005 (from memory). */
static void pe100_creeps_as_a_laboratory_pipe_did(void **state)
{
    (void)state;
    static const double ROWS[][2] = {{0.05, 1.057e-10},
                                     {0.5, 1.054e-10},
                                     {1.5, 0.9051e-10},
                                     {5.0, 2.617e-10},
                                     {10.0, 7.456e-10}};
    static const char *const IDS[] = {"PE100", "PE4710"};
    kent_catalogue *c = read_catalogue();
    for (size_t k = 0; k < 2; k++) {
        const kent_material *m = sure_material(c, IDS[k]);
        assert_int_equal(m->creep_count, 5);
        assert_close(m->creep_temperature, 293.15, 1e-12);
        for (size_t i = 0; i < 5; i++) {
            assert_close(m->creep[i].time, ROWS[i][0], 1e-12);
            assert_close(m->creep[i].compliance, ROWS[i][1], 1e-12);
        }
    }
    kent_catalogue_free(c);
}

/* Handbooks of plastic pipe (from memory): 3.0 GPa short-term, 1.5 GPa after 50 years.
 * The elements follow a compliance that grows with the logarithm of time between them,
 * from 0.01 s on, within a third of a decade's growth. */
static void pvc_creeps_with_the_logarithm_of_time(void **state)
{
    (void)state;
    static const char *const IDS[] = {"PVC-U", "PVC-12454"};
    const double years = 50.0 * 365.25 * 86400.0; /* s */
    const double decade = (1.0 / 1.5e9 - 1.0 / 3.0e9) / log10(years / 0.01);
    kent_catalogue *c = read_catalogue();
    for (size_t k = 0; k < 2; k++) {
        const kent_material *m = sure_material(c, IDS[k]);
        assert_int_equal(m->creep_count, 5);
        for (size_t i = 0; i < m->creep_count;
             i++) { /* the middles of decades, about */
            assert_close(m->creep[i].compliance, decade, 0.005);
            assert_close(m->creep[i].time, 0.03 * pow(10.0, (double)i), 1e-12);
        }
        for (int n = 0; n <= 5; n++) {
            const double t = 0.01 * pow(10.0, n);
            double grown = 0.0; /* 1/Pa */
            for (size_t i = 0; i < m->creep_count; i++) {
                grown += m->creep[i].compliance * (1.0 - exp(-t / m->creep[i].time));
            }
            assert_within(grown, decade * n, 0.34 * decade);
        }
    }
    kent_catalogue_free(c);
}

/* Expansion of length and modulus after 50 years: usual handbook values, from memory
 * (ductile iron 6.2e-6 per degF, steel 12e-6 of EN 1993-1-1, PVC 3e-5 and PE 8e-5 per
 * degF; PE4710 29 ksi of the Plastics Pipe Institute, PE100 0.2 GPa). */
static void materials_expand_and_yield_as_handbooks_have_it(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double expansion, modulus; /* 1e-6/K, GPa; 0: none */
    } ROWS[] = {{"ductile-iron", 6.2 * 1.8, 0.0},
                {"grey-iron", 10.5, 0.0},
                {"steel", 12.0, 0.0},
                {"PVC-U", 80.0, 1.5},
                {"PVC-12454", 30.0 * 1.8, 1.5},
                {"PE100", 180.0, 0.2},
                {"PE4710", 80.0 * 1.8, 29.0 * 6.894757293168e-3},
                {"asbestos-cement", 8.0, 0.0},
                {"concrete", 10.0, 0.0}};
    kent_catalogue *c = read_catalogue();
    assert_int_equal(c->material_count, sizeof ROWS / sizeof ROWS[0]);
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_material *m = kent_catalogue_material(c, ROWS[i].id);
        assert_close(m->expansion, ROWS[i].expansion * 1e-6, 0.005);
        assert_int_equal(isnan(m->long_modulus), ROWS[i].modulus <= 0.0);
        if (ROWS[i].modulus > 0.0) {
            assert_close(m->long_modulus, ROWS[i].modulus * 1e9, 1e-9);
        }
    }
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(materials_expand_and_yield_as_handbooks_have_it),
        cmocka_unit_test(materials_have_the_usual_values),
        cmocka_unit_test(plastics_are_weaker_when_warm),
        cmocka_unit_test(pe100_creeps_as_a_laboratory_pipe_did),
        cmocka_unit_test(pvc_creeps_with_the_logarithm_of_time),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
