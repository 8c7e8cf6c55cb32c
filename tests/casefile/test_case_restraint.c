/* What a case says of restraint beyond soils and loads, from text to model. */
#include "case_text.h"

#include <math.h>

static const double DEGREE = 3.14159265358979323846 / 180.0;

/* A sound case with a piece put in place of another; the caller frees neither. */
static kent_model *with(const kent_catalogue *c, const char *from, const char *to)
{
    char *text = replaced(DESIGN_CASE, from, to);
    kent_model *m = read_sound(c, text);
    free(text);
    assert_true(kent_model_is_valid(m));
    return m;
}

/* ---- ground ---------------------------------------------------------------------- */

#define GROUND "ground = { soil = \"sand-SP\""

static void what_is_no_natural_ground_is_not_relied_on_unasked(void **state)
{
    (void)state;
    static const struct {
        const char *keys;
        kent_nature nature;
        bool unreliable;
        size_t cautions;
    } ROWS[] = {
        {"", KENT_NATURAL, false, 0},
        {"nature = \"natural\"; unreliable = true;", KENT_NATURAL, true, 0},
        {"nature = \"fill\";", KENT_FILL, true, 0},
        {"nature = \"liquefiable\";", KENT_LIQUEFIABLE, true, 0},
        {"nature = \"collapsible\"; unreliable = false;", KENT_COLLAPSIBLE, false, 1},
        {"from = \"peat-PT\";", KENT_ORGANIC, true, 0}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char piece[300];
        (void)snprintf(
            piece, sizeof piece,
            "soils = ( { id = \"bank\"; allowable_bearing = \"90 kPa\"; %s } "
            ");\nground = { soil = \"bank\"",
            ROWS[i].keys);
        kent_model *m = with(c, GROUND, piece);
        assert_int_equal(m->soils[0].nature, ROWS[i].nature);
        assert_int_equal(m->soils[0].unreliable, ROWS[i].unreliable);
        assert_int_equal(cautions_with(m, "how it was made good"), ROWS[i].cautions);
        kent_model_free(m);
    }
    kent_catalogue_free(c);
}

static void a_base_is_held_by_friction_or_by_adhesion(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m =
        with(c, GROUND,
             "soils = ( { id = \"bank\"; from = \"bedrock-by-gradient-IBC\"; "
             "base_cohesion = \"6 kPa\"; unit_weight = \"18 kN/m^3\"; friction_angle = "
             "\"30 deg\"; passive_share = "
             "0.5; bearing_route = \"passive\"; wall_friction = \"15 deg\"; } "
             ");\nground = { soil = \"bank\"");
    assert_close(m->soils[0].base_cohesion, 6e3, 1e-12);
    assert_true(isnan(m->soils[0].base_friction)); /* the row's 0.70 has gone */
    assert_close(m->soils[0].wall_friction, 15.0 * DEGREE, 1e-12);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_trench_is_filled_with_what_is_said_of_it(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = with(c, GROUND, GROUND "; backfill = \"gravel-GP-Moser\"");
    assert_string_equal(m->soils[m->ground.backfill].id, "gravel-GP-Moser");
    assert_int_equal(m->ground_zones[0].backfill, -1);
    assert_false(m->ground_zones[0].casing);
    kent_model_free(m);
    m = with(c, "soil = \"soft-clay-CH\";", "backfill = \"silt-ML\"; casing = true;");
    assert_int_equal(m->ground.backfill, -1);
    assert_string_equal(m->soils[m->ground_zones[0].backfill].id, "silt-ML");
    assert_true(m->ground_zones[0].casing);
    assert_true(kent_model_ground_at(m, 0, 150.0).casing);
    assert_false(kent_model_ground_at(m, 0, 50.0).casing);
    kent_model_free(m);
    kent_catalogue_free(c);
}

/* ---- fittings -------------------------------------------------------------------- */

#define AT_B1 "{ at = \"B1\";"

static void a_fitting_has_what_is_stated_for_its_restraint(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m =
        with(c, AT_B1,
             AT_B1
             " restraint = \"block-and-joints\"; block_share = 0.4; reason = \"bank of "
             "the canal\"; backing = \"compacted-fill\"; contact_area = \"0.12 m^2\"; "
             "ground_slope = { direction = [ 0.0, -2.0, 9.0 ]; angle = \"12 deg\"; };");
    const kent_stated *s = &m->fittings[kent_model_fitting_of(m, "B1")].stated;
    assert_close(s->block_share, 0.4, 1e-15);
    assert_string_equal(s->reason, "bank of the canal");
    assert_int_equal(s->backing, KENT_BACKING_FILL);
    assert_close(s->contact_area, 0.12, 1e-12);
    assert_close(s->slope.angle, 12.0 * DEGREE, 1e-12);
    assert_close(s->slope.direction.y, -1.0, 1e-15);
    assert_close(s->slope.direction.z, 0.0, 1e-15);
    assert_false(s->closes_stated);
    kent_model_free(m);
    kent_catalogue_free(c);
}

#define TEE_PIPE "pipes = ( { id = \"A\";"
#define TEE                                                                            \
    "pipes = ( { id = \"C\"; route = [ \"T1\", \"X1\" ]; pipe_class = "                \
    "\"DI-EN545-C40-DN100\"; }, { id = \"A\";"

/* DESIGN_CASE with a branch at T1 and a note on it; the caller frees. */
static char *branched(const char *keys)
{
    char note[500];
    char *out = replaced(DESIGN_CASE, TEE_PIPE, TEE);
    char *more = replaced(out, "  { id = \"E1\";",
                          "  { id = \"X1\"; x = \"200 m\"; y = \"90 m\"; z = \"40 m\"; "
                          "},\n  { id = \"E1\";");
    free(out);
    (void)snprintf(note, sizeof note, "{ at = \"T1\"; %s }, " AT_B1, keys);
    out = replaced(more, AT_B1, note);
    free(more);
    return out;
}

static void a_tee_has_its_run_and_the_legs_that_can_be_shut(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text =
        branched("run_restrained = ( ( \"B1\", \"12 m\" ), ( \"R1\", \"20 ft\" ) "
                 "); can_close = [ \"X1\" ];");
    kent_model *m = read_sound(c, text);
    const kent_fitting *f = &m->fittings[kent_model_fitting_of(m, "T1")];
    const kent_port *ports = &m->ports[f->port_first];
    assert_string_equal(m->points[ports[0].toward].id, "R1");
    assert_close(f->stated.run_length[0], 20.0 * 0.3048, 1e-12);
    assert_close(f->stated.run_length[1], 12.0, 1e-15);
    assert_true(f->stated.closes_stated);
    assert_int_equal(f->stated.closes_count, 1);
    assert_string_equal(m->points[m->closes[f->stated.closes_first]].id, "X1");
    kent_model_free(m);
    free(text);
    text = branched("can_close = [ ];");
    m = read_sound(c, text);
    f = &m->fittings[kent_model_fitting_of(m, "T1")];
    assert_true(f->stated.closes_stated);
    assert_int_equal(f->stated.closes_count, 0);
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

static void pieces_in_line_are_types_of_a_case(void **state)
{
    (void)state;
    static const struct {
        const char *type;
        kent_role role;
    } ROWS[] = {{"wall-piece", KENT_ROLE_WALL},
                {"flange-adaptor", KENT_ROLE_FLANGE_ADAPTOR}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < 2; i++) {
        char piece[100];
        (void)snprintf(piece, sizeof piece, "{ at = \"T1\"; type = \"%s\"; }, " AT_B1,
                       ROWS[i].type);
        kent_model *m = with(c, AT_B1, piece);
        const kent_fitting *f = &m->fittings[kent_model_fitting_of(m, "T1")];
        assert_int_equal(f->type, KENT_STRAIGHT);
        assert_int_equal(f->role, ROWS[i].role);
        kent_model_free(m);
    }
    kent_catalogue_free(c);
}

/* ---- loads and pipes ------------------------------------------------------------- */

#define LOADS_KEY "loads = {"

static void loads_say_what_bears_more_and_what_is_left_out(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m =
        with(c, LOADS_KEY,
             LOADS_KEY " bearing_increase = { occasional = 1.33; }; thrust_area = "
                       "\"nominal\"; cooling = \"9 degR\"; waived = ( ( \"shut-off\", "
                       "\"no pump\" ), ( \"test\", \"old main\" ) );");
    const kent_loads *l = &m->loads;
    assert_close(l->bearing_increase[KENT_CASE_OCCASIONAL], 1.33, 1e-15);
    assert_close(l->bearing_increase[KENT_CASE_TEST], 1.0, 1e-15);
    assert_int_equal(cautions_with(m, "soil is let bear 1.33 times as much"), 1);
    assert_int_equal(l->thrust_area, KENT_AREA_NOMINAL);
    assert_close(m->pipes[0].nominal_size, 0.3, 1e-15); /* DN300 */
    assert_close(l->cooling, 5.0, 1e-12);
    assert_int_equal(m->waiver_count, 2);
    assert_string_equal(m->waivers[0].what, "shut-off");
    assert_string_equal(m->waivers[1].reason, "old main");
    kent_model_free(m);
    m = with(c, LOADS_KEY, LOADS_KEY);
    assert_int_equal(m->loads.thrust_area, KENT_AREA_OUTSIDE);
    assert_true(isnan(m->loads.cooling));
    assert_false(m->pipes[0].above_ground);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_pipe_cools_by_its_material_unless_it_says_otherwise(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text = replaced(DESIGN_CASE, LOADS_KEY, LOADS_KEY " cooling = \"12 K\";");
    char *pipe =
        replaced(text, "\"DI-EN545-C40-DN300\"; joint = \"push-on\";",
                 "\"PE100-SDR11-DN315\"; joint = \"fused\"; above_ground = true; "
                 "long_modulus = \"0.25 GPa\";");
    kent_model *m = read_sound(c, pipe);
    assert_close(m->pipes[0].expansion, 180e-6, 1e-12);
    assert_close(m->pipes[0].long_modulus, 0.25e9, 1e-12);
    assert_true(m->pipes[0].above_ground);
    assert_non_null(assumed(m, "thermal expansion of PE100"));
    assert_null(assumed(m, "long-term modulus of PE100")); /* the case's own */
    kent_model_free(m);
    free(pipe);
    free(text);
    kent_catalogue_free(c);
}

static void a_rule_without_effect_is_said_to_be(void **state)
{
    (void)state;
    static const struct {
        const char *rules, *says; /* with a factor of 1.5 on the thrust */
        bool told;
    } ROWS[] = {
        {"factor_sliding = 2.0;", "factor_sliding, 2.00, is asked only up", true},
        {"factor_sliding = 1.4;", "is asked only up", false},
        {"factor_overturning = 1.6;", "factor_overturning, 1.60, is", true},
        {"factor_stability_test = 1.6;", "factor_stability_test, 1.60", true},
        {"safety_factor = 2.0;", "safety_factor, 2.00, is not asked", true},
        {"factor_test = 2.0;", "factors = { test = 2.00; }", true},
        {"least_cover = \"0.7 m\";", "is not asked", false}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char piece[200];
        (void)snprintf(piece, sizeof piece, "design_rules = { %s };\n" GROUND,
                       ROWS[i].rules);
        kent_model *m = with(c, GROUND, piece);
        assert_int_equal(cautions_with(m, ROWS[i].says), ROWS[i].told);
        kent_model_free(m);
    }
    kent_catalogue_free(c);
}

static void cooling_of_a_main_that_slips_is_said_to_pull_nothing(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = with(c, LOADS_KEY, LOADS_KEY " cooling = \"10 K\";");
    assert_int_equal(cautions_with(m, "cooling is of fused and welded pipe"), 1);
    kent_model_free(m);
    kent_catalogue_free(c);
}

/* ---- concrete -------------------------------------------------------------------- */

static void concrete_is_of_a_class_or_has_a_strength_of_its_own(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = with(
        c, GROUND, "concrete = { class = \"C25/30\"; cement = \"rapid\"; };\n" GROUND);
    assert_close(m->concrete.strength, 25e6, 1e-12);
    assert_string_equal(m->concrete.id, "C25/30");
    assert_int_equal(m->concrete.cement, KENT_CEMENT_RAPID);
    assert_int_equal(m->concrete.place.line, 0); /* the catalogue's */
    assert_non_null(strstr(assumed(m, "strength of concrete"), "EN 206"));
    assert_null(assumed(m, "cement of concrete"));
    kent_model_free(m);

    m = with(c, GROUND, "concrete = { strength = \"28 MPa\"; };\n" GROUND);
    assert_close(m->concrete.strength, 28e6, 1e-12);
    assert_true(m->concrete.place.line > 0);
    assert_null(assumed(m, "strength of concrete"));
    assert_int_equal(m->concrete.cement, KENT_CEMENT_NORMAL);
    assert_non_null(assumed(m, "cement of concrete"));
    kent_model_free(m);

    m = with(c, GROUND, "concrete = { cement = \"slow\"; };\n" GROUND);
    assert_true(isnan(m->concrete.strength));
    assert_int_equal(m->concrete.cement, KENT_CEMENT_SLOW);
    assert_non_null(strstr(assumed(m, "strength of concrete"), "low class"));
    kent_model_free(m);
    kent_catalogue_free(c);
}

/* ---- the project ----------------------------------------------------------------- */

static void a_project_has_a_utility_and_a_date(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = with(c, GROUND,
                         "project = { utility = \"Drumlow Water\"; date = "
                         "\"2026-05-04\"; };\n" GROUND);
    assert_string_equal(m->project.utility, "Drumlow Water");
    assert_string_equal(m->project.date, "2026-05-04");
    kent_model_free(m);
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(what_is_no_natural_ground_is_not_relied_on_unasked),
        cmocka_unit_test(a_base_is_held_by_friction_or_by_adhesion),
        cmocka_unit_test(a_trench_is_filled_with_what_is_said_of_it),
        cmocka_unit_test(a_fitting_has_what_is_stated_for_its_restraint),
        cmocka_unit_test(a_tee_has_its_run_and_the_legs_that_can_be_shut),
        cmocka_unit_test(pieces_in_line_are_types_of_a_case),
        cmocka_unit_test(loads_say_what_bears_more_and_what_is_left_out),
        cmocka_unit_test(a_pipe_cools_by_its_material_unless_it_says_otherwise),
        cmocka_unit_test(a_rule_without_effect_is_said_to_be),
        cmocka_unit_test(cooling_of_a_main_that_slips_is_said_to_pull_nothing),
        cmocka_unit_test(concrete_is_of_a_class_or_has_a_strength_of_its_own),
        cmocka_unit_test(a_project_has_a_utility_and_a_date),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
