/* What the files of a catalogue may say, whatever config/ holds. */
#include "config_text.h"

#include <math.h>

#define PROVENANCE "source = \"a table\"; status = \"seen\"; "

static void a_fault_in_the_catalogue_is_told_with_its_file_and_line(void **state)
{
    (void)state;
    config_text config;
    kent_complaints c = {0};
    kent_error err = {0};
    kent_catalogue *catalogue = NULL;
    write_config(&config, "soils.cfg",
                 "format = 1;\nsoils = ( { id = \"a\"; allowable_bearing = \"2 m\";\n"
                 "  source = \"x\"; status = \"guess\"; } );\n");
    assert_int_equal(kent_catalogue_read(config.folder, &catalogue, &c, &err),
                     KENT_E_INPUT);
    assert_null(catalogue);
    assert_int_equal(c.count, 2);
    assert_string_equal(c.kept[0].file, config.path);
    assert_int_equal(c.kept[0].line, 2);
    assert_non_null(strstr(c.kept[0].what, "a length where a stress belongs"));
    assert_int_equal(c.kept[1].line, 3);
    assert_non_null(strstr(c.kept[1].what, "status = \"guess\" is not known"));
    remove_config(&config);
}

static void the_environment_says_where_the_catalogue_is(void **state)
{
    (void)state;
    kent_complaints c = {0};
    kent_error err = {0};
    kent_catalogue *catalogue = NULL;
    assert_int_equal(setenv("KENTLEDGE_CONFIG", "/nowhere", 1), 0);
    assert_int_equal(kent_catalogue_read(NULL, &catalogue, &c, &err), KENT_E_IO);
    assert_non_null(strstr(err.where, "/nowhere/"));
    assert_int_equal(setenv("KENTLEDGE_CONFIG", KENT_SOURCE_DIR "/config", 1), 0);
    err = (kent_error){0};
    assert_int_equal(kent_catalogue_read(NULL, &catalogue, &c, &err), KENT_OK);
    kent_catalogue_free(catalogue);
    assert_int_equal(unsetenv("KENTLEDGE_CONFIG"), 0);
}

/* ---- soils ----------------------------------------------------------------------- */

static void the_bearing_of_a_soil_is_read_by_each_of_its_four_ways(void **state)
{
    (void)state;
    static const char TEXT[] =
        "format = 1;\nsoils = (\n"
        "  { id = \"a\"; allowable_bearing = \"100 kPa\"; factor_inside = "
        "2.0; " PROVENANCE "},\n"
        "  { id = \"b\"; bearing_by_depth = ( ( \"1 m\", \"50 kPa\" ), ( \"2 m\", "
        "\"80 kPa\" ) ); base_friction = 0.35; " PROVENANCE "},\n"
        "  { id = \"c\"; bearing_gradient = \"30 kN/m^3\"; " PROVENANCE "},\n"
        "  { id = \"d\"; passive_share = 0.5; passive_ratios = ( ( \"type-3\", 0.6 ), "
        "( \"type-1\", 0.2 ) ); " PROVENANCE "} );\n";
    kent_catalogue *catalogue = NULL;
    kent_complaints c;
    assert_int_equal(read_config("soils.cfg", TEXT, &catalogue, &c), KENT_OK);
    assert_int_equal(catalogue->soil_count, 4);
    const kent_soil *s = catalogue->soils;
    assert_int_equal(s[0].route, KENT_BEARING_CONSTANT);
    assert_close(s[0].allowable_bearing, 100e3, 1e-12);
    assert_close(s[0].factor_inside, 2.0, 1e-12);
    assert_string_equal(s[0].source, "a table (seen)");
    assert_int_equal(s[1].route, KENT_BEARING_BY_DEPTH);
    assert_true(isnan(s[1].allowable_bearing));
    assert_int_equal(s[1].by_depth_count, 2);
    assert_close(s[1].by_depth[1].depth, 2.0, 1e-12);
    assert_close(s[1].by_depth[1].bearing, 80e3, 1e-12);
    assert_close(s[1].base_friction, 0.35, 1e-12);
    assert_int_equal(s[2].route, KENT_BEARING_GRADIENT);
    assert_close(s[2].bearing_gradient, 30e3, 1e-12);
    assert_int_equal(s[3].route, KENT_BEARING_PASSIVE);
    assert_close(s[3].passive_share, 0.5, 1e-12);
    assert_close(s[3].passive_by_trench[2], 0.6, 1e-12);
    assert_close(s[3].passive_by_trench[0], 0.2, 1e-12);
    assert_true(isnan(s[3].passive_by_trench[1]));
    kent_catalogue_free(catalogue);
}

static void a_soil_whose_bearing_is_not_clear_is_refused(void **state)
{
    (void)state;
    static const struct {
        const char *values, *words;
    } ROWS[] = {
        {"unreliable = false;", "its bearing is missing"},
        {"allowable_bearing = \"1 kPa\"; passive_share = 0.5;",
         "allowable_bearing and passive_share are both given; say by bearing_route "
         "which decides, or keep one"},
        {"bearing_gradient = \"30 kN/m^3\"; bearing_route = \"passive\";",
         "bearing_route names a bearing that is not given; give passive_share"},
        {"bearing_by_depth = ( ( \"1 m\", \"50 kPa\" ) );", "at least two pairs"},
        {"bearing_by_depth = ( ( \"2 m\", \"50 kPa\" ), ( \"1 m\", \"60 kPa\" ) );",
         "pair 2 of bearing_by_depth: depths must rise"},
        {"bearing_by_depth = ( ( \"1 m\", \"50 kPa\" ), ( \"2 m\", \"-1 kPa\" ) );",
         "pair 2 of bearing_by_depth"},
        {"bearing_by_depth = ( ( \"1 m\" ), ( \"2 m\", \"1 kPa\" ) );",
         "element 1 of bearing_by_depth must be a pair, as ( \"1.4 m\", \"150 kPa\" )"},
        {"bearing_by_depth = ( ( \"1 m\", \"1 m\" ), ( \"2 m\", \"1 kPa\" ) );",
         "a length where a stress belongs"},
        {"allowable_bearing = \"1 kPa\"; passive_ratios = ( ( \"type-9\", 0.4 ) );",
         "element 1 of passive_ratios must be a pair of a trench"},
        {"allowable_bearing = \"1 kPa\"; passive_ratios = ( ( \"type-1\", 1.4 ) );",
         "element 1 of passive_ratios must be a pair of a trench"},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char text[400];
        (void)snprintf(text, sizeof text,
                       "format = 1;\nsoils = ( { id = \"a\"; %s " PROVENANCE "} );\n",
                       ROWS[i].values);
        assert_config_refused("soils.cfg", text, ROWS[i].words);
    }
}

/* ---- materials ------------------------------------------------------------------- */

#define MATERIAL                                                                       \
    "format = 1;\nmaterials = ( { id = \"ductile-iron\"; elastic_modulus = \"1 "       \
    "GPa\"; "                                                                          \
    "poisson_ratio = 0.4; density = \"955 kg/m^3\"; roughness = \"0.01 "               \
    "mm\";\n" PROVENANCE

/* For the classes of config/pipes.cfg, which name their materials. */
static const char NO_PIPES[] = "format = 1;\n";

static void ratings_of_a_plastic_fall_with_its_temperature(void **state)
{
    (void)state;
    config_text config;
    kent_complaints c = {0};
    kent_error err = {0};
    kent_catalogue *catalogue = NULL;
    char path[128];
    write_config(&config, "materials.cfg",
                 MATERIAL "plastic = true; derating = ( ( \"20 degC\", 1.0 ), "
                          "( \"30 degC\", 0.8 ), ( \"40 degC\", 0.6 ) );\n"
                          "creep = ( ( \"0.05 s\", \"1e-10 1/Pa\" ), ( \"1 s\", "
                          "\"3e-10 1/Pa\" ) ); } );\n");
    (void)snprintf(path, sizeof path, "%s/pipes.cfg", config.folder);
    FILE *pipes = fopen(path, "w");
    assert_non_null(pipes);
    assert_true(fputs(NO_PIPES, pipes) >= 0);
    assert_int_equal(fclose(pipes), 0);
    assert_int_equal(kent_catalogue_read(config.folder, &catalogue, &c, &err), KENT_OK);
    const kent_material *m = kent_catalogue_material(catalogue, "ductile-iron");
    assert_non_null(m);
    assert_true(m->plastic);
    assert_close(kent_material_derating(m, 278.15), 1.0, 1e-12);
    assert_close(kent_material_derating(m, 293.15), 1.0, 1e-12);
    assert_close(kent_material_derating(m, 298.15), 0.9, 1e-12);
    assert_close(kent_material_derating(m, 303.15), 0.8, 1e-12);
    assert_close(kent_material_derating(m, 310.65), 0.65, 1e-12);
    assert_close(kent_material_derating(m, 313.15), 0.6, 1e-12);
    assert_true(isnan(kent_material_derating(m, 313.25)));
    assert_true(isnan(kent_material_derating(m, (double)NAN)));
    assert_int_equal(m->creep_count, 2);
    assert_close(m->creep[1].time, 1.0, 1e-12);
    assert_close(m->creep[1].compliance, 3e-10, 1e-12);
    kent_catalogue_free(catalogue);
    remove_config(&config);
}

static void a_material_without_rows_keeps_its_ratings(void **state)
{
    (void)state;
    const kent_material iron = {.modulus = 170e9};
    assert_close(kent_material_derating(&iron, 350.0), 1.0, 1e-12);
}

static void creep_and_derating_that_make_no_sense_are_refused(void **state)
{
    (void)state;
    static const struct {
        const char *values, *words;
    } ROWS[] = {
        {"derating = ( ( \"20 degC\", 1.0 ), ( \"30 degC\", 0.8 ) );",
         "creep and derating are of a plastic"},
        {"plastic = true; derating = ( ( \"20 degC\", 0.8 ), ( \"30 degC\", 0.9 ) );",
         "pair 2 of derating"},
        {"plastic = true; derating = ( ( \"30 degC\", 0.9 ), ( \"20 degC\", 0.8 ) );",
         "pair 2 of derating"},
        {"plastic = true; derating = ( ( \"30 degC\", 1.2 ) );", "pair 1 of derating"},
        {"plastic = true; creep = ( ( \"1 s\", \"1e-10 1/Pa\" ), ( \"1 s\", \"1e-10 "
         "1/Pa\" ) );",
         "pair 2 of creep: times must rise"},
        {"plastic = true; creep = ( ( \"1 s\", \"0 1/Pa\" ) );", "pair 1 of creep"},
        {"plastic = true; creep = ( ( \"1 s\", \"1 GPa\" ) );",
         "a pressure where a compliance belongs"},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char text[600];
        kent_catalogue *catalogue = NULL;
        kent_complaints c;
        (void)snprintf(text, sizeof text, MATERIAL "%s } );\n", ROWS[i].values);
        assert_int_equal(read_config("materials.cfg", text, &catalogue, &c),
                         KENT_E_INPUT);
        if (!strstr(c.kept[0].what, ROWS[i].words)) {
            print_error("%s\n", c.kept[0].what);
        }
        assert_non_null(strstr(c.kept[0].what, ROWS[i].words));
    }
}

/* ---- pipes ----------------------------------------------------------------------- */

#define STANDARD                                                                       \
    "format = 1;\nstandards = ( { id = \"S\"; standard = \"a standard\"; material = "  \
    "\"steel\"; unit = \"mm\"; before_size = \"DN\"; " PROVENANCE "\n"

static const kent_pipe_class *first_pipe(const char *text, kent_catalogue **catalogue)
{
    kent_complaints c;
    const kent_status status = read_config("pipes.cfg", text, catalogue, &c);
    if (c.count > 0) print_error("%s\n", c.kept[0].what);
    assert_int_equal(status, KENT_OK);
    return (*catalogue)->pipes;
}

static void a_table_may_give_ratios_or_one_wall_in_place_of_walls(void **state)
{
    (void)state;
    kent_catalogue *catalogue = NULL;
    const kent_pipe_class *p = first_pipe(
        STANDARD
        "walls = \"minimum\"; tolerance_per_wall = 0.1; tolerance = \"1 mm\";\n"
        "surge_factor = 1.5; surge_addition = \"2 bar\"; recurring_factor = 1.25;\n"
        "test_addition = \"3 bar\";\n"
        "classes = ( { id = \"R\"; diameter_ratio = 10.0; pressure_rating = "
        "\"8 bar\"; least_size = 100.0; }, { id = \"W\"; wall = \"5 mm\"; "
        "most_size = 100.0; }, { id = \"T\"; } );\n"
        "rows = ( ( 80.0, 90.0, 0.0, 4.0 ), ( 100.0, 110.0, 1.0, 0.0 ), "
        "( 150.0, 160.0, 0.0, 6.0 ) ); } );\n",
        &catalogue);
    static const struct {
        const char *id;
        double least, mean; /* mm */
    } ROWS[] = {{"S-W-DN80", 5.0, 6.5},    {"S-T-DN80", 4.0, 5.4},
                {"S-R-DN100", 11.0, 13.1}, {"S-W-DN100", 5.0, 6.5},
                {"S-R-DN150", 16.0, 18.6}, {"S-T-DN150", 6.0, 7.6}};
    assert_int_equal(catalogue->pipe_count, 6);
    for (size_t i = 0; i < 6; i++) {
        assert_string_equal(p[i].id, ROWS[i].id);
        assert_close(p[i].wall_minimum, 1e-3 * ROWS[i].least, 1e-12);
        assert_close(p[i].wall, 1e-3 * ROWS[i].mean, 1e-12);
    }
    assert_close(p[2].surge_rating, 14e5, 1e-12);
    assert_close(p[2].recurring_rating, 10e5, 1e-12);
    assert_close(p[2].test_rating, 17e5, 1e-12);
    assert_true(isnan(p[0].surge_rating)); /* no rating in service */
    kent_catalogue_free(catalogue);
}

static void tolerances_may_go_by_the_size(void **state)
{
    (void)state;
    kent_catalogue *catalogue = NULL;
    const kent_pipe_class *p = first_pipe(
        STANDARD
        "walls = \"nominal\"; tolerances = ( ( 100.0, 0.5 ), ( 200.0, 0.7 ) );\n"
        "classes = ( { id = \"T\"; } );\n"
        "rows = ( ( 80.0, 90.0, 0.0, 4.0 ), ( 200.0, 210.0, 0.0, 4.0 ), "
        "( 250.0, 260.0, 0.0, 4.0 ) ); } );\n",
        &catalogue);
    assert_close(p[0].wall_minimum, 3.5e-3, 1e-12);
    assert_close(p[1].wall_minimum, 3.3e-3, 1e-12);
    assert_true(isnan(p[2].wall_minimum)); /* larger than any that is given */
    assert_close(p[2].wall, 4e-3, 1e-12);
    kent_catalogue_free(catalogue);
}

static void lists_longer_than_is_read_are_refused(void **state)
{
    (void)state;
    char text[2000];
    char list[1500] = "";
    size_t used = 0;
    kent_catalogue *catalogue = NULL;
    kent_complaints c;
    for (int i = 1; i <= KENT_CREEP_ROWS + 1; i++) {
        used +=
            (size_t)snprintf(list + used, sizeof list - used,
                             "%s( \"%d s\", \"1e-10 1/Pa\" )", i > 1 ? ", " : "", i);
    }
    (void)snprintf(text, sizeof text, MATERIAL "plastic = true; creep = ( %s ); } );\n",
                   list);
    assert_int_equal(read_config("materials.cfg", text, &catalogue, &c), KENT_E_INPUT);
    assert_non_null(strstr(c.kept[0].what, "creep has 9 pairs; at most 8 are read"));

    used = 0;
    for (int i = 1; i <= 17; i++) {
        used += (size_t)snprintf(list + used, sizeof list - used, "%s{ id = \"C%d\"; }",
                                 i > 1 ? ", " : "", i);
    }
    (void)snprintf(text, sizeof text,
                   STANDARD "walls = \"nominal\"; classes = ( %s ); rows = ( ); } );\n",
                   list);
    assert_int_equal(read_config("pipes.cfg", text, &catalogue, &c), KENT_E_INPUT);
    assert_non_null(strstr(c.kept[0].what, "more than 16 classes"));
}

static void tables_of_pipes_that_make_no_sense_are_refused(void **state)
{
    (void)state;
    static const struct {
        const char *values, *words;
    } ROWS[] = {
        {"classes = ( { id = \"R\"; diameter_ratio = 10.0; wall = \"5 mm\"; } ); rows "
         "= "
         "( ( 80.0, 90.0, 0.0 ) );",
         "diameter_ratio and wall are both given; keep one"},
        {"classes = ( { id = \"R\"; diameter_ratio = 10.0; } ); rows = ( ( 80.0, 90.0, "
         "0.0, 4.0 ) );",
         "row 1 must hold 3 numbers"},
        {"classes = ( { id = \"T\"; } ); rows = ( ( 80.0, 90.0, 0.0 ) );",
         "row 1 must hold 4 numbers"},
        {"classes = ( { id = \"T\"; } ); rows = ( ( 80.0, 0.0, 0.0, 4.0 ) );",
         "row 1: number 2 is not positive"},
        {"tolerances = ( ( 200.0, 0.5 ), ( 100.0, 0.7 ) ); classes = ( { id = \"T\"; } "
         ");"
         " rows = ( ( 80.0, 90.0, 0.0, 4.0 ) );",
         "pair 2 of tolerances: sizes must rise"},
        {"classes = ( { id = \"A-class-whose-name-is-far-too-long-for-an-id\"; } ); "
         "rows = ( ( 80.0, 90.0, 0.0, 4.0 ) );",
         "ids of row 1 are too long"},
        {"classes = ( { id = \"T\"; }, { id = \"T\"; } ); rows = ( ( 80.0, 90.0, 0.0, "
         "4.0, 5.0 ) );",
         "is given twice"},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char text[700];
        kent_catalogue *catalogue = NULL;
        kent_complaints c;
        (void)snprintf(text, sizeof text, STANDARD "walls = \"nominal\"; %s } );\n",
                       ROWS[i].values);
        assert_int_equal(read_config("pipes.cfg", text, &catalogue, &c), KENT_E_INPUT);
        if (!strstr(c.kept[0].what, ROWS[i].words)) {
            print_error("%s\n", c.kept[0].what);
        }
        assert_non_null(strstr(c.kept[0].what, ROWS[i].words));
    }
}

/* ---- valves ---------------------------------------------------------------------- */

static void a_type_of_valve_says_something_of_what_it_passes(void **state)
{
    (void)state;
    assert_config_refused(
        "valves.cfg", "format = 1;\nvalves = ( { id = \"mute\"; " PROVENANCE "} );\n",
        "nothing is said of what it passes");
}

/* ---- rules ----------------------------------------------------------------------- */

#define RULES                                                                          \
    "format = 1;\nrules = ( { id = \"mine\"; safety_factor = 1.5; height_to_depth = "  \
    "0.5; width_to_height_least = 1.0; width_to_height_most = 2.0; least_thickness = " \
    "\"0.45 m\"; least_height = \"0.3 m\"; side_step = \"0.05 m\"; least_cover = "     \
    "\"0.6 m\"; concrete_unit_weight = \"23.5 kN/m^3\"; water_unit_weight = \"9.81 "   \
    "kN/m^3\"; wrapped_ratio = 0.7; largest_volume = \"60 m^3\";\n" PROVENANCE

static void rules_may_have_a_factor_of_their_own_under_test(void **state)
{
    (void)state;
    kent_catalogue *catalogue = NULL;
    kent_complaints c;
    assert_int_equal(
        read_config("rules.cfg", RULES "factor_test = 1.2; } );\n", &catalogue, &c),
        KENT_OK);
    assert_close(catalogue->rules[0].factor_test, 1.2, 1e-12);
    kent_catalogue_free(catalogue);
    assert_int_equal(read_config("rules.cfg", RULES "} );\n", &catalogue, &c), KENT_OK);
    assert_true(isnan(catalogue->rules[0].factor_test));
    kent_catalogue_free(catalogue);
}

static void a_set_has_what_it_is_based_on(void **state)
{
    (void)state;
    kent_catalogue *catalogue = NULL;
    kent_complaints c;
    const char *text =
        RULES "soils = \"mine\"; run_share = 0.5; },\n{ id = \"other\"; based_on = "
              "\"mine\"; least_cover = \"1 m\"; " PROVENANCE "} );\n";
    assert_int_equal(read_config("rules.cfg", text, &catalogue, &c), KENT_OK);
    const kent_rules *r = &catalogue->rules[1];
    assert_string_equal(r->id, "other");
    assert_string_equal(r->soils, ""); /* a factor's soils are its own set's */
    assert_close(r->safety_factor, 1.5, 1e-12);
    assert_close(r->least_cover, 1.0, 1e-12);
    assert_close(r->run_share, 0.5, 1e-12);
    kent_catalogue_free(catalogue);
}

#define SET(says) "format = 1;\nrules = ( { id = \"set\"; " says PROVENANCE "} );\n"

static void a_set_that_is_wrong_is_told(void **state)
{
    (void)state;
    assert_config_refused("rules.cfg", SET("based_on = \"none\"; "),
                          "there is no set \"none\" above this one");
    assert_config_refused("rules.cfg", SET("safety_factor = 1.5; "),
                          "'height_to_depth' is missing; give it, or based_on");
    assert_config_refused("rules.cfg", RULES "factor_sliding = 0.9; } );\n",
                          "factor_sliding = 0.9 asks for less than balance");
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_fault_in_the_catalogue_is_told_with_its_file_and_line),
        cmocka_unit_test(the_environment_says_where_the_catalogue_is),
        cmocka_unit_test(the_bearing_of_a_soil_is_read_by_each_of_its_four_ways),
        cmocka_unit_test(a_soil_whose_bearing_is_not_clear_is_refused),
        cmocka_unit_test(ratings_of_a_plastic_fall_with_its_temperature),
        cmocka_unit_test(a_material_without_rows_keeps_its_ratings),
        cmocka_unit_test(creep_and_derating_that_make_no_sense_are_refused),
        cmocka_unit_test(a_table_may_give_ratios_or_one_wall_in_place_of_walls),
        cmocka_unit_test(tolerances_may_go_by_the_size),
        cmocka_unit_test(lists_longer_than_is_read_are_refused),
        cmocka_unit_test(tables_of_pipes_that_make_no_sense_are_refused),
        cmocka_unit_test(a_type_of_valve_says_something_of_what_it_passes),
        cmocka_unit_test(rules_may_have_a_factor_of_their_own_under_test),
        cmocka_unit_test(a_set_has_what_it_is_based_on),
        cmocka_unit_test(a_set_that_is_wrong_is_told),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
