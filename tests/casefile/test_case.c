/* From text to model: values, what is assumed, and that nothing crashes. */
#include "case_text.h"

#include <math.h>

static void values_arrive_in_si(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, SOUND_CASE);
    assert_string_equal(m->title, "Quarry lane");
    assert_int_equal(m->point_count, 3);
    assert_close(m->points[1].at.x, 400.0, 1e-15);
    assert_close(m->points[1].at.z, 30.0, 1e-15);
    assert_int_equal(m->pipe_count, 1);
    const kent_pipe *p = &m->pipes[0];
    assert_close(p->outside_diameter, 0.326, 1e-12);
    assert_close(p->wall_minimum, 0.0046, 1e-12);
    assert_close(p->wall, 0.0062, 1e-12);
    assert_close(p->lining, 0.004, 1e-12);
    assert_close(p->inside_diameter, 0.326 - 2.0 * (0.0062 + 0.004), 1e-12);
    assert_close(p->modulus, 170e9, 1e-12);
    assert_int_equal(p->friction, KENT_COLEBROOK_WHITE);
    assert_close(p->friction_coefficient, 1e-4, 1e-12);
    assert_close(m->fixed_levels[0].level, 80.0, 1e-15);
    assert_close(m->valves[0].flow, 0.1, 1e-12);
    assert_true(isnan(m->valves[0].capacity));
    assert_close(m->valves[0].discharge_level, 21.0, 1e-15);
    assert_close(m->scenarios[0].duration, 30.0, 1e-15);
    assert_close(m->events[0].ramp_time, 10.0, 1e-15);
    assert_within(m->events[0].to, 0.0, 0.0);
    assert_close(m->loads.test_pressure, 12e5, 1e-12);
    assert_int_equal(m->loads.test_gauge, 2);
    assert_close(m->loads.factor[KENT_CASE_TEST], 1.5, 1e-15);
    assert_close(m->loads.factor[KENT_CASE_SUCTION], 1.5, 1e-15);
    assert_int_equal(m->ground.soil, 0);
    assert_string_equal(m->soils[0].id, "sand-SP");
    assert_true(isinf(m->ground.water_table));
    assert_true(kent_model_is_valid(m));
    assert_int_equal(m->pipes[0].place.line, 8);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void defaults_are_those_of_the_table_and_are_said(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, SOUND_CASE);
    assert_close(m->water.temperature, 288.15, 1e-12);
    assert_non_null(assumed(m, "water temperature"));
    assert_non_null(strstr(assumed(m, "water temperature"), "15 degC"));
    assert_close(m->barometric, kent_barometric_pressure(0.0), 1e-15);
    assert_non_null(assumed(m, "barometric pressure"));
    assert_close(m->gravity, 9.80665, 1e-15);
    assert_close(m->gravity, strtod(kent_key_find("site", "gravity")->fallback, NULL),
                 1e-15);
    assert_close(m->solver.wave_speed_tolerance, 0.02, 1e-15);
    assert_int_equal(m->solver.min_reaches, 20);
    assert_int_equal(m->solver.history_rows, 20000);
    assert_close(
        m->solver.wave_speed_tolerance,
        strtod(kent_key_find("solver", "wave_speed_tolerance")->fallback, NULL), 1e-15);
    assert_int_equal(
        m->solver.min_reaches,
        strtol(kent_key_find("solver", "min_reaches")->fallback, NULL, 10));
    assert_int_equal(
        m->solver.history_rows,
        strtol(kent_key_find("solver", "history_rows")->fallback, NULL, 10));
    assert_true(m->solver.grid_check);
    assert_int_equal(m->solver.friction, KENT_SURGE_QUASI_STEADY);
    assert_non_null(assumed(m, "axial support of pipes with push-on joints"));
    assert_non_null(assumed(m, "roughness of ductile-iron"));
    assert_non_null(assumed(m, "modulus of ductile-iron"));
    assert_non_null(assumed(m, "wall of DI-EN545-C40-DN300"));
    assert_non_null(assumed(m, "allowable bearing of sand-SP"));
    assert_non_null(assumed(m, "design rules"));
    assert_non_null(strstr(assumed(m, "strength of concrete"), "16 MPa"));
    assert_non_null(strstr(assumed(m, "contact of fittings"), "0.71 diameters"));
    assert_null(assumed(m, "ground water"));  /* stated: none */
    assert_null(assumed(m, "safety factor")); /* stated */
    kent_model_free(m);
    kent_catalogue_free(c);
}

/* Without coordinates, and with a number at every key that a solver reads. */
static const char NUMBERS_CASE[] =
    "format = 1;\n"
    "points = ( { id = \"R\"; z = \"50 m\"; },\n"
    "  { id = \"K\"; z = \"30 m\"; cover = \"1.3 m\"; water_table = \"0.9 m\"; },\n"
    "  { id = \"W\"; z = \"25 m\"; }, { id = \"E\"; z = \"20 m\"; } );\n"
    "pipes = (\n"
    "  { id = \"C\"; route = [ \"W\", \"E\" ]; length = \"90 m\"; pipe_class = "
    "\"DI-EN545-C40-DN300\"; },\n"
    "  { id = \"A\"; route = [ \"R\", \"K\" ]; length = \"310 m\"; material = "
    "\"steel\";\n"
    "    outside_diameter = \"500 mm\"; wall_thickness = \"8 mm\"; lining_thickness = "
    "\"5 mm\";\n"
    "    poisson_ratio = 0.31; wall_theory = \"thin\"; joint = \"welded\"; loss = "
    "1.75;\n"
    "    pressure_rating = \"16 bar\"; pipe_length = \"6 m\"; joint_deflection = \"2 "
    "deg\"; },\n"
    "  { id = \"B\"; route = [ \"K\", \"W\" ]; length = \"190 m\"; wave_speed = "
    "\"1180 m/s\";\n"
    "    outside_diameter = \"500 mm\"; inside_diameter = \"470 mm\"; roughness = "
    "\"0.1 mm\"; } );\n"
    "fixed_levels = ( { at = \"R\"; level = \"80 m\"; loss = 0.5; } );\n"
    "outflows = ( { at = \"E\"; flow = \"18 L/s\"; pressure_dependent = true; "
    "full_pressure = \"2 bar\"; } );\n"
    "valves = ( { id = \"V\"; at = \"W\"; type = \"linear\"; size = \"400 mm\"; loss "
    "= 0.2; opening = 0.6; } );\n"
    "soils = ( { id = \"till\"; allowable_bearing = \"150 kPa\"; factor_inside = "
    "2.0;\n"
    "  vertical_bearing = \"120 kPa\"; unit_weight = \"19 kN/m^3\"; friction_angle = "
    "\"30 deg\";\n"
    "  cohesion = \"4 kPa\"; friction_ratio = 0.7; adhesion_ratio = 0.6; "
    "passive_ratio = 0.4; } );\n"
    "ground = { soil = \"till\"; cover = \"1.2 m\"; water_table = \"3 m\"; wrapped = "
    "true; };\n"
    "fittings = ( { at = \"K\"; weight = \"25 kN\"; face = \"0.7 m\"; cover = \"1.4 "
    "m\";\n"
    "  angle = \"30 deg\"; orientation = \"sag\"; } );\n"
    "loads = { static_level = \"85 m\"; safety_factor = 1.5; };\n"
    "solver = { time_step = \"0.01 s\"; grid_check = false; history_rows = 500; };\n";

static void every_number_of_a_case_arrives(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, NUMBERS_CASE);
    const kent_pipe *a = &m->pipes[1], *b = &m->pipes[2];
    assert_close(a->inside_diameter, 0.500 - 2.0 * (0.008 + 0.005), 1e-12);
    assert_close(a->length, 310.0, 1e-15);
    assert_close(a->poisson, 0.31, 1e-15);
    assert_close(a->modulus, 207e9, 1e-12);
    assert_true(a->thin_wall && !b->thin_wall);
    assert_close(a->loss, 1.75, 1e-15);
    assert_close(a->pressure_rating, 16e5, 1e-12);
    assert_close(a->laying_length, 6.0, 1e-15);
    assert_close(a->joint_deflection, 2.0 * acos(-1.0) / 180.0, 1e-12);
    assert_close(b->wave_speed, 1180.0, 1e-15);
    assert_close(b->derating, 1.0, 1e-15); /* of no material */
    assert_close(b->inside_diameter, 0.470, 1e-15);
    assert_close(m->fixed_levels[0].loss, 0.5, 1e-15);
    assert_true(m->outflows[0].pressure_dependent);
    assert_close(m->outflows[0].flow, 0.018, 1e-12);
    assert_close(m->outflows[0].full_pressure, 2e5, 1e-12);
    assert_close(m->valves[0].opening, 0.6, 1e-15);
    assert_close(m->valves[0].size, 0.4, 1e-15);
    assert_true(isnan(m->valves[0].discharge_level));
    const kent_soil *s = &m->soils[0];
    assert_close(s->vertical_bearing, 120e3, 1e-12);
    assert_close(s->friction_angle, acos(-1.0) / 6.0, 1e-12);
    assert_close(s->cohesion, 4e3, 1e-12);
    assert_close(s->friction_ratio, 0.7, 1e-15);
    assert_close(s->adhesion_ratio, 0.6, 1e-15);
    assert_close(s->passive_ratio, 0.4, 1e-15);
    assert_true(m->ground.wrapped);
    assert_close(m->ground.water_table, 3.0, 1e-15);
    assert_close(m->points[1].cover, 1.3, 1e-15);
    assert_close(m->points[1].water_table, 0.9, 1e-15);
    assert_close(m->notes[0].weight, 25e3, 1e-12);
    assert_close(m->notes[0].face, 0.7, 1e-15);
    assert_close(m->notes[0].cover, 1.4, 1e-15);
    assert_close(m->notes[0].angle, acos(-1.0) / 6.0, 1e-12);
    assert_int_equal(m->notes[0].orientation, KENT_SAG);
    assert_close(m->loads.static_level, 85.0, 1e-15);
    assert_close(m->solver.time_step, 0.01, 1e-15);
    assert_false(m->solver.grid_check);
    assert_int_equal(m->solver.history_rows, 500);
    kent_model_free(m);
    kent_catalogue_free(c);
}

/* The sound case with one piece replaced by a word in its frame ("class = \"%s\";"). */
static kent_model *read_worded(const kent_catalogue *c, const char *from,
                               const char *frame, const char *word)
{
    char piece[256];
    const int length = snprintf(piece, sizeof piece, frame, word); /* NOLINT: ours */
    assert_in_range(length, 1, sizeof piece - 1);
    char *text = replaced(SOUND_CASE, from, piece);
    kent_model *m = read_sound(c, text);
    free(text);
    return m;
}

static void words_become_what_they_say(void **state)
{
    (void)state;
    static const char *const JOINTS[] = {
        [KENT_PUSH_ON] = "push-on", [KENT_MECHANICAL] = "mechanical",
        [KENT_FLANGED] = "flanged", [KENT_WELDED] = "welded",
        [KENT_FUSED] = "fused",     [KENT_RESTRAINED] = "restrained"};
    static const char *const SUPPORTS[] = {[KENT_FLEXIBLE_JOINTS] = "flexible-joints",
                                           [KENT_FIXED_UPSTREAM] = "fixed-upstream",
                                           [KENT_FIXED_THROUGHOUT] =
                                               "fixed-throughout"};
    static const char *const CLASSES[] = {[KENT_RECURRING] = "recurring",
                                          [KENT_OCCASIONAL] = "occasional",
                                          [KENT_EXCEPTIONAL] = "exceptional"};
    static const char *const FRICTIONS[] = {[KENT_SURGE_NONE] = "none",
                                            [KENT_SURGE_CONSTANT] = "constant",
                                            [KENT_SURGE_QUASI_STEADY] = "quasi-steady"};
    static const char *const RESTRAINTS[] = {
        [KENT_THRUST_BLOCK] = "thrust-block",
        [KENT_ANCHOR_BLOCK] = "anchor-block",
        [KENT_RESTRAINED_JOINTS] = "restrained-joints",
        [KENT_BLOCK_AND_JOINTS] =
            "block-and-joints\"; block_share = 0.5; reason = \"both",
        [KENT_NO_RESTRAINT] = "none"};
    kent_catalogue *c = read_catalogue();

    for (int i = 0; i < 6; i++) {
        const bool stiff = i == KENT_FLANGED || i == KENT_WELDED || i == KENT_FUSED;
        kent_model *m =
            read_worded(c, "joint = \"push-on\";", "joint = \"%s\";", JOINTS[i]);
        assert_int_equal(m->pipes[0].joint, i);
        assert_int_equal(m->pipes[0].axial_support,
                         stiff ? KENT_FIXED_THROUGHOUT : KENT_FLEXIBLE_JOINTS);
        kent_model_free(m);
    }
    for (int i = 0; i < 3; i++) {
        kent_model *m = read_worded(c, "joint = \"push-on\";",
                                    "axial_support = \"%s\";", SUPPORTS[i]);
        assert_int_equal(m->pipes[0].axial_support, i);
        kent_model_free(m);
        m = read_worded(c, "class = \"occasional\";", "class = \"%s\";", CLASSES[i]);
        assert_int_equal(m->scenarios[0].class_of, i);
        kent_model_free(m);
        m = read_worded(
            c, "ground =", "solver = { friction = \"%s\"; };\nground =", FRICTIONS[i]);
        assert_int_equal(m->solver.friction, i);
        kent_model_free(m);
    }
    for (int i = 0; i < 5; i++) {
        kent_model *m = read_worded(
            c, "ground =",
            "fittings = ( { at = \"B1\"; restraint = \"%s\"; } );\nground =",
            RESTRAINTS[i]);
        assert_int_equal(m->notes[0].restraint, i);
        kent_model_free(m);
    }
    kent_catalogue_free(c);
}

static void each_law_of_friction_is_read_with_its_number(void **state)
{
    (void)state;
    static const struct {
        const char *keys;
        kent_friction_law law;
        double coefficient;
    } ROWS[] = {{"roughness = \"0.2 mm\";", KENT_COLEBROOK_WHITE, 2e-4},
                {"hazen_williams_c = 130;", KENT_HAZEN_WILLIAMS, 130.0},
                {"manning_n = 0.011;", KENT_MANNING, 0.011},
                {"friction_factor = 0.02;", KENT_DARCY_FIXED, 0.02}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        kent_model *m = read_worded(c, "joint = \"push-on\";", "%s", ROWS[i].keys);
        assert_int_equal(m->pipes[0].friction, ROWS[i].law);
        assert_close(m->pipes[0].friction_coefficient, ROWS[i].coefficient, 1e-12);
        kent_model_free(m);
    }
    kent_catalogue_free(c);
}

/* Capacity E of Q = E sqrt(head lost), m^2.5/s: K on 300 mm; Kv in m3/h at 1 bar; Cv in
 * US gallon/min at 1 psi, water of 1000 kg/m3. The butterfly's own K is 0.24. */
static void each_way_to_state_a_valve_gives_its_capacity(void **state)
{
    (void)state;
    const double g = 9.80665, bore = 0.25 * acos(-1.0) * 0.09; /* m/s2, m2 */
    const struct {
        const char *keys;
        double capacity;
    } rows[] = {
        {"loss = 2.0;", bore * sqrt(2.0 * g / 2.0)},
        {"kv = 600;", 600.0 / 3600.0 / sqrt(1e5 / (1000.0 * g))},
        {"cv = 600;", 600.0 * 3.785411784e-3 / 60.0 / sqrt(6894.757293168 / 1e3 / g)},
        {"", bore * sqrt(2.0 * g / 0.24)}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        kent_model *m = read_worded(c, "flow = \"100 L/s\";", "%s ", rows[i].keys);
        assert_close(m->valves[0].capacity, rows[i].capacity, 1e-9);
        assert_true(isnan(m->valves[0].flow));
        kent_model_free(m);
    }
    kent_catalogue_free(c);
}

static void what_is_stated_is_not_noted_as_assumed(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *a =
        replaced(SOUND_CASE, "joint = \"push-on\";",
                 "joint = \"push-on\"; axial_support = \"fixed-upstream\"; roughness "
                 "= \"0.2 mm\"; elastic_modulus = \"160 GPa\"; wall_thickness = \"7 "
                 "mm\";");
    char *b =
        replaced(a, "ground =",
                 "water = { temperature = \"50 degF\"; };\nsite = { altitude = \"300 "
                 "m\"; gravity = \"9.81 m/s^2\"; };\nground =");
    kent_model *m = read_sound(c, b);
    assert_close(m->water.temperature, 283.15, 1e-9);
    assert_close(m->gravity, 9.81, 1e-15);
    assert_close(m->pipes[0].wall, 0.007, 1e-12);
    assert_true(isnan(m->pipes[0].wall_minimum)); /* the class's goes with its wall */
    assert_close(m->pipes[0].modulus, 160e9, 1e-12);
    assert_null(assumed(m, "water temperature"));
    assert_null(assumed(m, "barometric pressure"));
    assert_null(assumed(m, "axial support of pipes with push-on joints"));
    assert_null(assumed(m, "roughness of ductile-iron"));
    assert_null(assumed(m, "modulus of ductile-iron"));
    assert_null(assumed(m, "wall of DI-EN545-C40-DN300"));
    kent_model_free(m);
    free(a);
    free(b);
    kent_catalogue_free(c);
}

static void joints_and_supports_are_assumed_only_unsaid(void **state)
{
    (void)state;
    static const char JOINT[] = "joint of pipes that name none";
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, SOUND_CASE);
    assert_null(assumed(m, JOINT));
    kent_model_free(m);
    m = read_worded(c, "joint = \"push-on\";", "%s", " ");
    assert_int_equal(m->pipes[0].joint, KENT_PUSH_ON);
    assert_non_null(assumed(m, JOINT));
    kent_model_free(m);
    /* the first of the words, against what the joint would give */
    m = read_worded(c, "joint = \"push-on\";",
                    "joint = \"welded\"; axial_support = \"%s\";", "flexible-joints");
    assert_int_equal(m->pipes[0].axial_support, KENT_FLEXIBLE_JOINTS);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_valve_without_a_type_is_linear_and_says_so(void **state)
{
    (void)state;
    static const char TYPE[] = "type of valves that name none";
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_worded(c, "type = \"butterfly\";", "%s", " ");
    assert_string_equal(m->valves[0].type, "linear");
    assert_non_null(assumed(m, TYPE));
    kent_model_free(m);
    m = read_worded(c, "type = \"butterfly\";", "type = \"%s\";", "linear");
    assert_string_equal(m->valves[0].type, "linear");
    assert_null(assumed(m, TYPE));
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_pipe_that_cannot_be_worked_out_is_refused(void **state)
{
    (void)state;
    static const struct {
        const char *keys, *what;
    } ROWS[] = {
        {"outside_diameter = \"326 mm\"; wave_speed = \"1100 m/s\"; roughness = \"0.1 "
         "mm\";",
         "pipe \"A\": its diameters are not known; give pipe_class, or "
         "outside_diameter "
         "with wall_thickness or inside_diameter"},
        {"outside_diameter = \"326 mm\"; inside_diameter = \"300 mm\"; roughness = "
         "\"0.1 "
         "mm\"; elastic_modulus = \"170 GPa\";",
         "pipe \"A\": its wave speed cannot be computed; give material, or "
         "elastic_modulus and poisson_ratio, or wave_speed"},
        {"outside_diameter = \"300 mm\"; inside_diameter = \"300 mm\"; wave_speed = "
         "\"1100 "
         "m/s\"; roughness = \"0.1 mm\";",
         "pipe \"A\": its diameters do not fit: 300 mm outside, 300 mm inside, lining "
         "0 mm "
         "leave no wall"},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char *text =
            replaced(SOUND_CASE, "pipe_class = \"DI-EN545-C40-DN300\";", ROWS[i].keys);
        assert_refused_at(c, text, 8, ROWS[i].what);
        free(text);
    }
    kent_catalogue_free(c);
}

static void a_case_may_override_single_design_rules(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text =
        replaced(SOUND_CASE, "ground =",
                 "design_rules = { set = \"common-practice\"; least_thickness = "
                 "\"0.6 m\"; spread = \"plain-concrete\"; soil_above = true; "
                 "factor_sliding = 2.0; };\nground =");
    kent_model *m = read_sound(c, text);
    assert_close(m->rules.least_thickness, 0.6, 1e-12);
    assert_close(m->rules.least_height, 0.3, 1e-12);
    assert_int_equal(cautions_with(m, "design rule least_thickness = 0.6 m is"), 1);
    assert_int_equal(cautions_with(m, "design rule spread = plain-concrete is"), 1);
    assert_int_equal(cautions_with(m, "design rule soil_above = true is"), 1);
    assert_int_equal(cautions_with(m, "design rule factor_sliding = 2 is"), 1);
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

/* 1.1 is asked for on the bearings of one table; on those of another, four to eight
 * times higher for the same words, it would be no factor at all. */
static void a_factor_for_the_bearings_of_one_table_is_cautioned_on_others(void **state)
{
    (void)state;
    static const struct {
        const char *rules, *soils, *loads;
        int cautions;
    } ROWS[] = {
        {"set = \"AS2280-own-bearings\";", "sand-SP", "", 1},
        {"set = \"AS2280-own-bearings\";", "sand-SP-by-depth-AS2280", "", 0},
        {"set = \"AS2280-own-bearings\";", "sand-SW-by-depth-USDA", "", 1},
        {"set = \"common-practice\";", "sand-SP", "", 0},
        {"set = \"AS2280-own-bearings\";", "sand-SP", "safety_factor = 1.5; ", 0},
        {"set = \"AS2280-own-bearings\"; safety_factor = 1.5;", "sand-SP", "", 0},
        {"set = \"AS2280-own-bearings\"; }; soils = ( { id = \"own\"; from = "
         "\"clay-CL-by-depth-AS2280\"; unit_weight = \"19 kN/m^3\"; } ); site = {",
         "own", "", 0},
        {"set = \"AS2280-own-bearings\"; }; soils = ( { id = \"own\"; from = "
         "\"clay-CL-by-depth-AS2280\"; bearing_by_depth = ( ( \"1 m\", \"200 kPa\" ), "
         "( \"2 m\", \"300 kPa\" ) ); } ); site = {",
         "own", "", 1}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char rules[300];
        char loads[60];
        char soil[60];
        (void)snprintf(rules, sizeof rules, "design_rules = { %s };\nground = { soil",
                       ROWS[i].rules);
        (void)snprintf(loads, sizeof loads, "%stest_pressure", ROWS[i].loads);
        (void)snprintf(soil, sizeof soil, "soil = \"%s\";", ROWS[i].soils);
        char *bare = replaced(SOUND_CASE, "safety_factor = 1.5; ", "");
        char *ruled = replaced(bare, "ground = { soil", rules);
        char *loaded = replaced(ruled, "test_pressure", loads);
        char *text = replaced(loaded, "soil = \"sand-SP\";", soil);
        kent_model *m = read_sound(c, text);
        assert_int_equal(cautions_with(m, "is meant for the bearings of its own table"),
                         ROWS[i].cautions);
        kent_model_free(m);
        free(text);
        free(loaded);
        free(ruled);
        free(bare);
    }
    kent_catalogue_free(c);
}

static void a_case_in_US_units_has_blocks_in_whole_inches(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text = replaced(SOUND_CASE, "points", "units = \"US\";\npoints");
    kent_model *m = read_sound(c, text);
    assert_string_equal(m->rules.id, "common-practice-US");
    assert_close(m->rules.side_step, 2.0 * 0.0254, 1e-12);
    kent_model_free(m);
    free(text);
    m = read_sound(c, SOUND_CASE);
    assert_string_equal(m->rules.id, "common-practice");
    assert_close(m->rules.side_step, 0.05, 1e-12);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_soil_may_start_from_a_row_of_the_catalogue(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *a =
        replaced(SOUND_CASE, "ground =",
                 "soils = ( { id = \"fill\"; from = \"sand-SP\"; unit_weight = \"18 "
                 "kN/m^3\"; factor_inside = 2.0; } );\nground =");
    char *b =
        replaced(a, "ground = { soil = \"sand-SP\"", "ground = { soil = \"fill\"");
    kent_model *m = read_sound(c, b);
    assert_int_equal(m->soil_count, 1);
    assert_within(m->soils[0].allowable_bearing, 4000.0 * 47.880258980335843, 1e-6);
    assert_close(m->soils[0].unit_weight, 18e3, 1e-12);
    assert_close(m->soils[0].factor_inside, 2.0, 1e-15);
    kent_model_free(m);
    free(a);
    free(b);
    kent_catalogue_free(c);
}

static void factors_by_load_case_replace_the_one_factor(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text =
        replaced(SOUND_CASE, "safety_factor = 1.5;",
                 "safety_factor = 1.5; factors = { test = 1.2; exceptional = 1.1; "
                 "steady = 1.3; recurring = 2.0; occasional = 1.6; };");
    kent_model *m = read_sound(c, text);
    assert_close(m->loads.factor[KENT_CASE_TEST], 1.2, 1e-15);
    assert_close(m->loads.factor[KENT_CASE_EXCEPTIONAL], 1.1, 1e-15);
    assert_close(m->loads.factor[KENT_CASE_STATIC], 1.5, 1e-15);
    assert_close(m->loads.factor[KENT_CASE_STEADY], 1.3, 1e-15);
    assert_close(m->loads.factor[KENT_CASE_RECURRING], 2.0, 1e-15);
    assert_close(m->loads.factor[KENT_CASE_OCCASIONAL], 1.6, 1e-15);
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

static const char PORTS_CASE[] =
    "format = 1;\n"
    "fittings = ( { id = \"B7\"; type = \"bend\"; ports = (\n"
    "  { direction = [ -2.0, 0.0, 0.0 ]; pressure = \"140 kPa\"; flow = \"-0.425 "
    "m^3/s\";\n"
    "    inside_diameter = \"600 mm\"; momentum_factor = 1.0; },\n"
    "  { direction = ( 1, 1, 0 ); pressure = \"123.05 kPa\"; flow = \"0.425 m^3/s\";\n"
    "    inside_diameter = \"300 mm\"; outside_diameter = \"326 mm\"; } ); } );\n";

static void a_case_may_hold_nothing_but_a_fitting_with_ports(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, PORTS_CASE);
    assert_int_equal(m->given_port_count, 2);
    const kent_port *p = m->given_ports;
    assert_close(p[0].direction.x, -1.0, 1e-15); /* made a unit vector */
    assert_close(p[1].direction.y, sqrt(0.5), 1e-12);
    assert_close(p[0].seal_diameter, 0.6, 1e-12);   /* the bore */
    assert_close(p[1].seal_diameter, 0.326, 1e-12); /* the outside */
    assert_close(p[0].momentum_factor, 1.0, 1e-15);
    assert_true(isnan(p[1].momentum_factor));
    assert_int_equal(m->fitting_count, 1);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void flows_of_given_ports_balance_to_a_millionth(void **state)
{
    (void)state;
    static const char *const FLOWS[] = {"\"0.4250004 m^3/s\"", "\"0.425001 m^3/s\""};
    kent_catalogue *c = read_catalogue();
    for (int i = 0; i < 2; i++) {
        char *text = replaced(PORTS_CASE, "\"0.425 m^3/s\"", FLOWS[i]);
        kent_complaints complaints;
        kent_model *m = NULL;
        assert_int_equal(read_bytes(c, text, strlen(text), &m, &complaints),
                         i == 0 ? KENT_OK : KENT_E_INPUT);
        if (i == 1) assert_non_null(strstr(complaints.kept[0].what, "do not balance"));
        kent_model_free(m);
        free(text);
    }
    kent_catalogue_free(c);
}

static void an_opening_law_keeps_its_points(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text = replaced(
        SOUND_CASE, "ramp_time = \"10 s\"; to = 0.0;",
        "opening_law = ( ( \"0 s\", 1.0 ), ( \"4 s\", 0.2 ), ( \"0.5 min\", 0 ) );");
    kent_model *m = read_sound(c, text);
    assert_int_equal(m->events[0].law_count, 3);
    assert_close(m->law[2].time, 30.0, 1e-12);
    assert_close(m->law[1].value, 0.2, 1e-15);
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

static void more_faults_than_are_kept_are_still_counted(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_text text = {0};
    kent_complaints complaints;
    kent_model *m = NULL;
    kent_text_add(&text, "format = 1;\npoints = (\n");
    for (int i = 0; i < 50; i++) {
        kent_text_add(&text, "%s{ id = \"P%d\"; z = 1.5; }\n", i ? ", " : "", i);
    }
    kent_text_add(&text, ");\n");
    assert_int_equal(read_bytes(c, text.s, text.length, &m, &complaints), KENT_E_INPUT);
    assert_int_equal(complaints.count, 50);
    assert_int_equal(complaints.kept[0].line, 3);
    assert_int_equal(complaints.kept[19].line, 22);
    kent_text_clear(&text);
    kent_catalogue_free(c);
}

/* Cut short or spoiled anywhere, a case is read or refused, never worse. */
static void a_case_cut_short_anywhere_is_refused(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    const size_t size = strlen(SOUND_CASE);
    for (size_t cut = 0; cut < size; cut += 10) {
        kent_complaints complaints;
        kent_model *m = NULL;
        const kent_status status = read_bytes(c, SOUND_CASE, cut, &m, &complaints);
        if (status != KENT_OK) assert_true(complaints.count > 0);
        kent_model_free(m);
    }
    kent_catalogue_free(c);
}

static void a_case_with_any_byte_spoiled_is_read_or_refused(void **state)
{
    (void)state;
    static const char SPOILS[] = {'\0', '{', ')', '"',  ',',   '=',
                                  '@',  '9', '-', '\n', '\x80'};
    kent_catalogue *c = read_catalogue();
    const size_t size = strlen(SOUND_CASE);
    char *text = kent_copy_text(SOUND_CASE);
    assert_non_null(text);
    for (size_t at = 0; at < size; at += 13) {
        const char was = text[at];
        kent_complaints complaints;
        kent_model *m = NULL;
        text[at] = SPOILS[(at / 13) % sizeof SPOILS];
        const kent_status status = read_bytes(c, text, size, &m, &complaints);
        assert_true(status == KENT_OK ? m != NULL : complaints.count > 0);
        kent_model_free(m);
        text[at] = was;
    }
    free(text);
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(values_arrive_in_si),
        cmocka_unit_test(defaults_are_those_of_the_table_and_are_said),
        cmocka_unit_test(every_number_of_a_case_arrives),
        cmocka_unit_test(words_become_what_they_say),
        cmocka_unit_test(each_law_of_friction_is_read_with_its_number),
        cmocka_unit_test(each_way_to_state_a_valve_gives_its_capacity),
        cmocka_unit_test(what_is_stated_is_not_noted_as_assumed),
        cmocka_unit_test(joints_and_supports_are_assumed_only_unsaid),
        cmocka_unit_test(a_valve_without_a_type_is_linear_and_says_so),
        cmocka_unit_test(a_pipe_that_cannot_be_worked_out_is_refused),
        cmocka_unit_test(a_case_may_override_single_design_rules),
        cmocka_unit_test(a_factor_for_the_bearings_of_one_table_is_cautioned_on_others),
        cmocka_unit_test(a_case_in_US_units_has_blocks_in_whole_inches),
        cmocka_unit_test(a_soil_may_start_from_a_row_of_the_catalogue),
        cmocka_unit_test(factors_by_load_case_replace_the_one_factor),
        cmocka_unit_test(a_case_may_hold_nothing_but_a_fitting_with_ports),
        cmocka_unit_test(flows_of_given_ports_balance_to_a_millionth),
        cmocka_unit_test(an_opening_law_keeps_its_points),
        cmocka_unit_test(more_faults_than_are_kept_are_still_counted),
        cmocka_unit_test(a_case_cut_short_anywhere_is_refused),
        cmocka_unit_test(a_case_with_any_byte_spoiled_is_read_or_refused),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
