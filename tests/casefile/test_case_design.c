/* Ground, fittings and loads from text to model: values, and what is refused. */
#include "case_text.h"

#include <math.h>

/* The soil "bank" by some keys, under the whole main. */
static char *with_bank(const char *keys)
{
    char piece[400];
    (void)snprintf(piece, sizeof piece,
                   "soils = ( { id = \"bank\"; %s } );\nground = { soil = \"bank\"",
                   keys);
    return replaced(DESIGN_CASE, "ground = { soil = \"sand-SP\"", piece);
}

static void a_bearing_is_known_in_one_of_four_ways(void **state)
{
    (void)state;
    static const struct {
        const char *keys;
        double constant, gradient, share; /* Pa, Pa/m, - */
        double inside;
        kent_bearing_route route;
        bool assumes_inside;
    } ROWS[] = {
        {"allowable_bearing = \"150 kPa\"; factor_inside = 2.0;", 150e3, NAN, NAN, 2.0,
         KENT_BEARING_CONSTANT, false},
        {"allowable_bearing = \"150 kPa\";", 150e3, NAN, NAN, 1.0,
         KENT_BEARING_CONSTANT, true},
        {"allowable_bearing = \"0 kPa\";", 0.0, NAN, NAN, 1.0, KENT_BEARING_CONSTANT,
         false},
        {"bearing_by_depth = ( ( \"1 m\", \"80 kPa\" ), ( \"2 m\", \"120 kPa\" ) );",
         NAN, NAN, NAN, 1.0, KENT_BEARING_BY_DEPTH, true},
        {"bearing_gradient = \"31.4 kPa/m\"; factor_inside = 1.5;", NAN, 31.4e3, NAN,
         1.5, KENT_BEARING_GRADIENT, false},
        {"passive_share = 0.4; unit_weight = \"19 kN/m^3\"; friction_angle = \"30 "
         "deg\";",
         NAN, NAN, 0.4, 1.0, KENT_BEARING_PASSIVE, true},
        {"passive_share = 0.4; unit_weight = \"19 kN/m^3\"; cohesion = \"20 kPa\";",
         NAN, NAN, 0.4, 1.0, KENT_BEARING_PASSIVE, true},
        /* a way of the case's own takes the place of the row's */
        {"from = \"sand-SP\"; bearing_gradient = \"31.4 kPa/m\";", NAN, 31.4e3, NAN,
         1.0, KENT_BEARING_GRADIENT, true},
        /* several at once, one of which decides */
        {"allowable_bearing = \"150 kPa\"; bearing_gradient = \"31.4 kPa/m\"; "
         "bearing_route = \"per-depth\";",
         150e3, 31.4e3, NAN, 1.0, KENT_BEARING_GRADIENT, true},
        {"allowable_bearing = \"150 kPa\"; bearing_gradient = \"31.4 kPa/m\"; "
         "bearing_route = \"presumptive\";",
         150e3, 31.4e3, NAN, 1.0, KENT_BEARING_CONSTANT, true},
        {"from = \"sand-SP\"; bearing_by_depth = ( ( \"1 m\", \"80 kPa\" ), ( \"2 m\", "
         "\"120 kPa\" ) ); passive_share = 0.4; bearing_route = \"by-depth\";",
         NAN, NAN, 0.4, 1.0, KENT_BEARING_BY_DEPTH, true},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char *text = with_bank(ROWS[i].keys);
        kent_model *m = read_sound(c, text);
        const kent_soil *s = &m->soils[0];
        assert_int_equal(s->route, ROWS[i].route);
        assert_true(isnan(ROWS[i].constant) ? isnan(s->allowable_bearing)
                                            : s->allowable_bearing == ROWS[i].constant);
        assert_true(isnan(ROWS[i].gradient)
                        ? isnan(s->bearing_gradient)
                        : fabs(s->bearing_gradient - ROWS[i].gradient) < 1e-6);
        assert_true(isnan(ROWS[i].share) ? isnan(s->passive_share)
                                         : s->passive_share == ROWS[i].share);
        assert_close(s->factor_inside, ROWS[i].inside, 1e-15);
        assert_int_equal(s->by_depth_count, s->route == KENT_BEARING_BY_DEPTH ? 2 : 0);
        const char *inside = assumed(m, "factor inside the bearing of bank");
        assert_int_equal(inside != NULL, ROWS[i].assumes_inside);
        if (inside) assert_string_equal(inside, "1.0\tfactor_inside not given");
        assert_null(assumed(m, "allowable bearing of sand-SP"));
        kent_model_free(m);
        free(text);
    }
    kent_catalogue_free(c);
}

static void a_soil_says_where_its_values_come_from(void **state)
{
    (void)state;
    static const struct {
        const char *keys, *source; /* how the source starts */
    } ROWS[] = {
        {"allowable_bearing = \"90 kPa\";", "given in the case"},
        {"from = \"peat-PT\";", "given in the case, else "}, /* the first row */
        {"from = \"sand-SP\"; source = \"borehole 7\";", "borehole 7"},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char *text = with_bank(ROWS[i].keys);
        kent_model *m = read_sound(c, text);
        assert_memory_equal(m->soils[0].source, ROWS[i].source, strlen(ROWS[i].source));
        kent_model_free(m);
        free(text);
    }
    kent_catalogue_free(c);
}

static void the_bearing_of_a_row_is_assumed_in_its_own_way(void **state)
{
    (void)state;
    static const struct {
        kent_bearing_route route;
        const char *what, *value;
    } ROWS[] = {
        {KENT_BEARING_CONSTANT, "allowable bearing of sand-SP", "191.52 kPa\t"},
        {KENT_BEARING_BY_DEPTH, "bearing by depth of sand-SP", "50 kPa to 90 kPa\t"},
        {KENT_BEARING_GRADIENT, "bearing per depth of sand-SP", "31.4 kN/m3\t"},
        {KENT_BEARING_PASSIVE, "share of the passive earth pressure of sand-SP",
         "0.25\t"},
    };
    kent_catalogue *c = read_catalogue();
    size_t sand = 0;
    while (strcmp(c->soils[sand].id, "sand-SP") != 0) {
        sand++;
    }
    kent_soil *row = &c->soils[sand];
    row->by_depth_count = 2;
    row->by_depth[0] = (kent_depth_row){1.0, 50e3};
    row->by_depth[1] = (kent_depth_row){2.0, 90e3};
    row->bearing_gradient = 31.4e3;
    row->passive_share = 0.25;
    row->unit_weight = 19e3;
    row->friction_angle = 0.5;
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        row->route = ROWS[i].route;
        kent_model *m = read_sound(c, DESIGN_CASE);
        const char *note = assumed(m, ROWS[i].what);
        assert_non_null(note);
        assert_memory_equal(note, ROWS[i].value, strlen(ROWS[i].value));
        kent_model_free(m);
    }
    kent_catalogue_free(c);
}

static void a_bearing_that_cannot_be_known_is_refused(void **state)
{
    (void)state;
    static const struct {
        const char *keys, *what;
    } ROWS[] = {
        {"unit_weight = \"19 kN/m^3\";",
         "soil \"bank\": its bearing is missing; give allowable_bearing, "
         "bearing_by_depth, bearing_gradient or passive_share, or name a soil of the "
         "catalogue by from"},
        {"passive_share = 0.4; friction_angle = \"30 deg\";",
         "soil \"bank\": passive_share needs unit_weight, from which the passive earth "
         "pressure follows"},
        {"passive_share = 0.4; unit_weight = \"19 kN/m^3\";",
         "soil \"bank\": passive_share needs friction_angle or cohesion, from which "
         "the "
         "passive earth pressure follows"},
        {"allowable_bearing = \"90 kPa\"; bearing_gradient = \"31 kPa/m\";",
         "soil \"bank\": allowable_bearing and bearing_gradient are both given; say by "
         "bearing_route which decides, or keep one"},
        {"allowable_bearing = \"90 kPa\"; bearing_route = \"per-depth\";",
         "soil \"bank\": bearing_route names a bearing that is not given; give "
         "bearing_gradient, or name another"},
        {"bearing_by_depth = ( ( \"1 m\", \"80 kPa\" ) );",
         "soil \"bank\": bearing_by_depth needs at least two pairs (depth, bearing); a "
         "bearing for every depth is allowable_bearing"},
        {"bearing_by_depth = ( ( \"2 m\", \"80 kPa\" ), ( \"1 m\", \"90 kPa\" ) );",
         "soil \"bank\": pair 2 of bearing_by_depth: depths must rise from above 0 m, "
         "bearings not be negative"},
        {"bearing_by_depth = ( ( \"2 m\", \"80 kPa\" ), \"1 m\" );",
         "soil \"bank\": element 2 of bearing_by_depth must be a pair, as ( \"1.4 m\", "
         "\"150 kPa\" )"},
        {"bearing_by_depth = ( ( \"1 m\", \"80 kPa\" ), ( \"2 m\", \"80 MPa\" ) );",
         "soil \"bank\": pair 2 of bearing_by_depth: the bearing is out of range; the "
         "range is 0 to 50000 kPa"},
        {"passive_share = 0.5; unit_weight = \"18 kN/m^3\"; friction_angle = \"0 "
         "deg\";",
         "soil \"bank\": passive_share is of the earth pressure that friction_angle "
         "and "
         "cohesion give, and both are nil; give the soil's strength, or its bearing in "
         "another way"},
        {"allowable_bearing = \"90 kPa\"; passive_ratios = ( ( \"type-1\", 0.4 ), ( "
         "\"type-1\", 0.5 ) );",
         "soil \"bank\": passive_ratios names \"type-1\" twice; keep one"},
        {"allowable_bearing = \"90 kPa\"; passive_ratios = ( ( \"type-6\", 0.4 ) );",
         "soil \"bank\": element 1 of passive_ratios must be a pair of a trench, "
         "type-1 to "
         "type-5, and a ratio from 0.0 to 1.0, as ( \"type-3\", 0.4 )"},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char *text = with_bank(ROWS[i].keys);
        assert_refused_at(c, text, 15, ROWS[i].what);
        free(text);
    }
    kent_catalogue_free(c);
}

static void zones_of_ground_arrive(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DESIGN_CASE);
    assert_int_equal(m->ground.trench, 1);
    assert_int_equal(m->ground_zone_count, 2);
    const kent_ground_zone *a = &m->ground_zones[0], *b = &m->ground_zones[1];
    assert_int_equal(a->pipe, 0);
    assert_close(a->from, 100.0, 1e-15);
    assert_close(a->to, 250.0, 1e-15);
    assert_string_equal(m->soils[a->soil].id, "soft-clay-CH");
    assert_true(isnan(a->cover) && isnan(a->water_table));
    assert_int_equal(a->trench, -1);
    assert_close(b->from, 250.0, 1e-15); /* where the first ends */
    assert_int_equal(b->soil, -1);
    assert_close(b->cover, 2.0, 1e-15);
    assert_close(b->water_table, 0.5, 1e-15);
    assert_int_equal(b->trench, 3);
    assert_int_equal(b->place.line, 18);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void an_obstacle_lies_sideways(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DESIGN_CASE);
    assert_int_equal(m->notes[0].obstacle_count, 1);
    const kent_obstacle *o = &m->obstacles[m->notes[0].obstacle_first];
    assert_string_equal(o->what, "sewer");
    assert_close(o->direction.x, 0.6, 1e-15); /* made level and a unit vector */
    assert_close(o->direction.y, -0.8, 1e-15);
    assert_within(o->direction.z, 0.0, 0.0);
    assert_close(o->distance, 1.8, 1e-15);
    assert_close(o->depth, 2.5, 1e-15);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void branches_and_roles_arrive(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text =
        replaced(DESIGN_CASE, "fittings = (",
                 "fittings = ( { at = \"T1\"; type = \"hydrant\"; apart = true;\n"
                 "  branch = { direction = [ 0.0, 2.0, 0.0 ]; outside_diameter = \"118 "
                 "mm\"; inside_diameter = \"100 mm\"; joint = \"mechanical\"; end = "
                 "\"valve\"; }; },");
    kent_model *m = read_sound(c, text);
    const kent_fitting_note *n = &m->notes[0];
    assert_int_equal(n->type, -1); /* geometry's */
    assert_int_equal(n->role, KENT_ROLE_HYDRANT);
    assert_true(n->apart);
    assert_close(n->branch.direction.y, 1.0, 1e-15);
    assert_close(n->branch.outside_diameter, 0.118, 1e-12);
    assert_close(n->branch.inside_diameter, 0.100, 1e-12);
    assert_int_equal(n->branch.joint, KENT_MECHANICAL);
    assert_int_equal(n->branch.end, KENT_BRANCH_VALVE);
    assert_null(assumed(m, "joint of branches that name none"));
    kent_model_free(m);
    free(text);

    static const struct {
        const char *word;
        kent_branch_end end;
    } ENDS[] = {{"blank", KENT_BRANCH_BLANK}, {"valve", KENT_BRANCH_VALVE}};
    for (size_t i = 0; i < sizeof ENDS / sizeof ENDS[0]; i++) {
        char piece[200];
        (void)snprintf(piece, sizeof piece,
                       "fittings = ( { at = \"T1\"; branch = { direction = [ 0.0, 1.0, "
                       "0.0 ]; outside_diameter = \"118 mm\"; end = \"%s\"; }; },",
                       ENDS[i].word);
        text = replaced(DESIGN_CASE, "fittings = (", piece);
        m = read_sound(c, text);
        assert_int_equal(m->notes[0].branch.end, ENDS[i].end);
        assert_int_equal(m->notes[0].branch.joint, KENT_FLANGED);
        assert_true(isnan(m->notes[0].branch.inside_diameter));
        assert_string_equal(assumed(m, "joint of branches that name none"),
                            "flanged\tthe usual joint of a branch");
        assert_null(assumed(m, "bore of open branches that state none"));
        kent_model_free(m);
        free(text);
    }
    kent_catalogue_free(c);
}

static void an_open_branch_without_a_bore_is_as_wide_as_it_is(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text = replaced(
        DESIGN_CASE, "fittings = (",
        "outflows = ( { at = \"T1\"; flow = \"10 L/s\"; } );\n"
        "fittings = ( { at = \"T1\"; branch = { direction = [ 0.0, 1.0, 0.0 ]; "
        "outside_diameter = \"118 mm\"; end = \"open\"; }; },");
    kent_model *m = read_sound(c, text);
    assert_int_equal(m->notes[0].branch.end, KENT_BRANCH_OPEN);
    assert_string_equal(assumed(m, "bore of open branches that state none"),
                        "the outside diameter\tinside_diameter not given");
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

static void each_word_of_a_role_is_read(void **state)
{
    (void)state;
    static const struct {
        const char *word;
        kent_role role;
    } ROWS[] = {{"tapping-tee", KENT_ROLE_TAPPING},
                {"hydrant", KENT_ROLE_HYDRANT},
                {"air-valve-tee", KENT_ROLE_AIR_VALVE},
                {"washout-tee", KENT_ROLE_WASHOUT}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char piece[240];
        (void)snprintf(
            piece, sizeof piece,
            "fittings = ( { at = \"T1\"; type = \"%s\"; branch = { direction "
            "= [ 0.0, 0.0, 1.0 ]; outside_diameter = \"118 mm\"; end = "
            "\"blank\"; }; },",
            ROWS[i].word);
        char *text = replaced(DESIGN_CASE, "fittings = (", piece);
        kent_model *m = read_sound(c, text);
        assert_int_equal(m->notes[0].role, ROWS[i].role);
        kent_model_free(m);
        free(text);
    }
    kent_catalogue_free(c);
}

static void a_straight_is_a_type_and_no_role(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text = replaced(DESIGN_CASE, "fittings = (",
                          "fittings = ( { at = \"T1\"; type = \"straight\"; },");
    kent_model *m = read_sound(c, text);
    assert_int_equal(m->notes[0].type, KENT_STRAIGHT);
    assert_int_equal(m->notes[0].role, KENT_ROLE_NONE);
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

static void points_may_be_held_together(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text = replaced(DESIGN_CASE, "at = \"B1\";",
                          "at = \"T1\"; branch = { direction = [ 0.0, 1.0, 0.0 ]; "
                          "outside_diameter = \"118 mm\"; end = \"blank\"; }; }, "
                          "{ at = \"B1\"; together_with = [ \"T1\" ];");
    kent_model *m = read_sound(c, text);
    assert_int_equal(m->notes[1].together_count, 1);
    assert_int_equal(m->together[m->notes[1].together_first], 1);
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

static void tests_are_stated_or_found_by_a_rule(void **state)
{
    (void)state;
    static const struct {
        const char *keys;
        kent_test_rule rule;
        double factor, allowance; /* -, Pa */
        const char *assumed, *value;
    } ROWS[] = {
        {"test_rule = \"EN805-surge-calculated\";", KENT_TEST_EN805_CALCULATED, 1.5,
         2e5, NULL, NULL},
        {"test_rule = \"EN805-surge-assumed\";", KENT_TEST_EN805_ASSUMED, 1.5, 2e5,
         "surge allowance of the test", "2 bar\t"},
        {"test_rule = \"EN805-surge-assumed\"; surge_allowance = \"3 bar\";",
         KENT_TEST_EN805_ASSUMED, 1.5, 3e5, NULL, NULL},
        {"test_rule = \"C600\";", KENT_TEST_C600, 1.5, 2e5, NULL, NULL},
        {"test_rule = \"working-factor\";", KENT_TEST_FACTOR, 1.5, 2e5, "test factor",
         "1.5\t"},
        {"test_rule = \"working-factor\"; test_factor = 1.25;", KENT_TEST_FACTOR, 1.25,
         2e5, NULL, NULL},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char *text = replaced(DESIGN_CASE, "test_pressure = \"12 bar\";", ROWS[i].keys);
        kent_model *m = read_sound(c, text);
        assert_int_equal(m->loads.test_rule, ROWS[i].rule);
        assert_true(isnan(m->loads.test_pressure));
        assert_int_equal(m->loads.test_gauge, 3);
        assert_close(m->loads.test_factor, ROWS[i].factor, 1e-15);
        assert_close(m->loads.surge_allowance, ROWS[i].allowance, 1e-12);
        assert_true(ROWS[i].assumed || (!assumed(m, "test factor") &&
                                        !assumed(m, "surge allowance of the test")));
        if (ROWS[i].assumed) {
            const char *note = assumed(m, ROWS[i].assumed);
            assert_non_null(note);
            assert_memory_equal(note, ROWS[i].value, strlen(ROWS[i].value));
        }
        kent_model_free(m);
        free(text);
    }
    kent_model *m = read_sound(c, DESIGN_CASE);
    assert_int_equal(m->loads.test_rule, KENT_TEST_FIXED);
    assert_close(m->loads.future_pressure, 9e5, 1e-12);
    assert_int_equal(m->loads.future_gauge, 1);
    assert_null(assumed(m, "test factor"));
    kent_model_free(m);
    kent_catalogue_free(c);
}

#define LOADS  "test_pressure = \"12 bar\"; test_gauge_at = \"E1\";"
#define FUTURE "future_pressure = \"9 bar\"; future_gauge_at = \"T1\";"
#define ZONE   "soil = \"soft-clay-CH\";"
#define BRANCH                                                                         \
    "{ at = \"T1\"; branch = { direction = [ 0.0, 1.0, 0.0 ]; outside_diameter = "

/* A piece of DESIGN_CASE, what stands in its place, and the one complaint. */
static const struct {
    const char *from, *to;
    int line;
    const char *what;
} FAULTS[] = {
    {"pipe = \"A\"; from = \"0+100\"", "pipe = \"B\"; from = \"0+100\"", 17,
     "ground zone 1: pipe: there is no pipe \"B\", nor one with a name like it"},
    {"\"0+250\"", "\"0+100\"", 17,
     "ground zone 1: to must lie beyond from; stations count along the pipe's route"},
    {ZONE, "", 17,
     "ground zone 1: it says nothing of the ground; give soil, cover, water_table, "
     "trench, backfill or casing"},
    {"\"250 m\"", "\"249.9 m\"", 18,
     "ground zone 2: it overlaps the zone of the same pipe at line 17; let one end "
     "where "
     "the next starts"},
    {"[ 3.0, -4.0, 1.0 ]", "[ 0.0, 0.0, 1.0 ]", 21,
     "fitting at \"B1\": obstacle 1: direction must point sideways: what lies above or "
     "below is no obstacle to a block"},
    {"at = \"B1\";", "at = \"B1\"; together_with = [ \"X1\" ];", 20,
     "fitting at \"B1\": together_with: there is no point \"X1\"; did you mean "
     "\"B1\"?"},
    {"at = \"B1\";", "at = \"B1\"; together_with = [ \"T1\", \"B1\" ];", 20,
     "fitting at \"B1\": together_with names \"B1\" itself; name the others"},
    {"at = \"B1\";", "at = \"B1\"; together_with = [ \"T1\", \"T1\" ];", 20,
     "fitting at \"B1\": together_with names \"T1\" twice; keep one"},
    {"at = \"B1\";", "at = \"B1\"; together_with = [ ];", 20,
     "fitting at \"B1\": together_with is empty; name the points whose fittings are "
     "held "
     "as one with this"},
    {"at = \"B1\";", "at = \"B1\"; together_with = [ \"T1\" ]; apart = true;", 20,
     "fitting at \"B1\": apart and together_with contradict each other; keep one"},
    {"{ at = \"B1\";", BRANCH "\"118 mm\"; end = \"shut\"; }; }, { at = \"B1\";", 20,
     "fitting at \"T1\": branch: end = \"shut\" is not known; it is one of \"blank\", "
     "\"valve\", \"open\""},
    {"{ at = \"B1\";",
     BRANCH "\"118 mm\"; inside_diameter = \"118 mm\"; end = \"open\"; }; }, { at = "
            "\"B1\";",
     20, "fitting at \"T1\": branch: inside_diameter is not below outside_diameter"},
    {LOADS, LOADS " test_rule = \"C600\";", 22,
     "loads: test_rule and test_pressure are both given; keep one"},
    {LOADS, "test_rule = \"C600\";", 22,
     "loads: test_rule needs test_gauge_at, the point where the pressure is read"},
    {LOADS, "test_gauge_at = \"E1\";", 22,
     "loads: test_gauge_at needs test_pressure, the pressure read there, or test_rule"},
    {LOADS, LOADS " test_factor = 1.4;", 22,
     "loads: test_factor is read by test_rule \"working-factor\" alone; name that "
     "rule, "
     "or leave it out"},
    {LOADS,
     "test_gauge_at = \"E1\"; test_rule = \"EN805-surge-calculated\"; surge_allowance "
     "= "
     "\"2 bar\";",
     22,
     "loads: surge_allowance is read by test_rule \"EN805-surge-assumed\" alone; name "
     "that rule, or leave it out"},
    {LOADS,
     "test_gauge_at = \"E1\"; test_rule = \"EN805-surge-assumed\"; surge_allowance = "
     "\"1.9 bar\";",
     22,
     "loads: surge_allowance = \"1.9 bar\" is out of range; the range is 2 to 1000 "
     "bar"},
    {FUTURE, "future_pressure = \"9 bar\";", 23,
     "loads: future_pressure needs future_gauge_at, the point where it is read"},
    {FUTURE, "future_gauge_at = \"T1\";", 23,
     "loads: future_gauge_at needs future_pressure, the pressure read there"},
};

static void each_fault_gets_its_one_complaint(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof FAULTS / sizeof FAULTS[0]; i++) {
        char *text = replaced(DESIGN_CASE, FAULTS[i].from, FAULTS[i].to);
        assert_refused_at(c, text, FAULTS[i].line, FAULTS[i].what);
        free(text);
    }
    kent_catalogue_free(c);
}

static void a_surge_to_test_by_needs_scenarios(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *a = replaced(DESIGN_CASE, "test_pressure = \"12 bar\";",
                       "test_rule = \"EN805-surge-calculated\";");
    char *b = replaced(a, "scenarios = (", "/* scenarios = (");
    char *text = replaced(b, "ground = {", "*/ ground = {");
    assert_refused_at(c, text, 22,
                      "loads: \"EN805-surge-calculated\" takes the surge of the "
                      "scenarios, and the case has none; describe them, or take "
                      "\"EN805-surge-assumed\"");
    free(a);
    free(b);
    free(text);
    kent_catalogue_free(c);
}

/* A fitting stated by its ports alone, with room for a key and for loads. */
static const char PORTS[] =
    "format = 1;\n"
    "points = ( { id = \"P\"; z = \"3 m\"; } );\n"
    "fittings = ( { id = \"B7\"; type = \"bend\"; ports = (\n"
    "  { direction = [ -1.0, 0.0, 0.0 ]; pressure = \"14 bar\"; inside_diameter = "
    "\"600 "
    "mm\"; },\n"
    "  { direction = [ 0.0, 1.0, 0.0 ]; pressure = \"14 bar\"; inside_diameter = \"600 "
    "mm\"; } ); } );\n"
    "loads = { safety_factor = 1.5; };\n";

static void what_needs_a_main_is_refused_beside_ports(void **state)
{
    (void)state;
    static const struct {
        const char *from, *to;
        int line;
        const char *what;
    } ROWS[] = {
        {"type = \"bend\";", "angle = \"45 deg\";", 3,
         "fitting \"B7\": angle is of a fitting found from geometry; ports state every "
         "leg of this one"},
        {"type = \"bend\";", "orientation = \"sag\";", 3,
         "fitting \"B7\": orientation is of a fitting found from geometry; ports state "
         "every leg of this one"},
        {"type = \"bend\";", "apart = true;", 3,
         "fitting \"B7\": apart is of a fitting found from geometry; ports state every "
         "leg of this one"},
        {"type = \"bend\";", "together_with = [ \"P\" ];", 3,
         "fitting \"B7\": together_with is of a fitting found from geometry; ports "
         "state "
         "every leg of this one"},
        {"type = \"bend\";",
         "branch = { outside_diameter = \"118 mm\"; end = \"blank\"; };", 3,
         "fitting \"B7\": branch is of a fitting found from geometry; ports state "
         "every "
         "leg of this one"},
        {"safety_factor", "test_rule = \"C600\"; safety_factor", 6,
         "loads: test_rule works from the pressures along pipes, and the case has "
         "none; "
         "state the pressure of each port"},
        {"safety_factor",
         "future_pressure = \"9 bar\"; future_gauge_at = \"P\"; safety_factor", 6,
         "loads: future_pressure is of a main with pipes, and the case has none; state "
         "the pressure of each port"},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char *text = replaced(PORTS, ROWS[i].from, ROWS[i].to);
        assert_refused_at(c, text, ROWS[i].line, ROWS[i].what);
        free(text);
    }
    kent_catalogue_free(c);
}

/* What is asked beyond the pipe's ratings, each key by its own; and left out. */
static void what_is_asked_of_pressures_arrives(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *joints = replaced(DESIGN_CASE, "joint = \"push-on\";",
                            "joint = \"push-on\"; joint_rating = \"12 bar\";");
    char *often = replaced(joints, "class = \"occasional\";",
                           "class = \"recurring\"; cycles_per_day = 3.5;");
    char *rated = replaced(often, "{ at = \"B1\"; obstacles",
                           "{ at = \"B1\"; rating = \"16 bar\"; surge_rating = \"20 "
                           "bar\"; standard = \"EN 1092-2, PN 16\"; obstacles");
    char *text = replaced(rated, "loads = {",
                          "limits = { lowest_steady = \"1.4 bar\"; lowest_recurring = "
                          "\"0.2 bar\"; lowest_occasional = \"0 bar\"; "
                          "lowest_exceptional = \"-0.4 bar\"; life = \"50 years\"; };\n"
                          "loads = {");
    kent_model *m = read_sound(c, text);
    assert_close(m->pipes[0].joint_rating, 12e5, 1e-12);
    assert_false(m->pipes[0].plastic);
    assert_close(m->scenarios[0].cycles_per_day, 3.5, 1e-15);
    assert_close(m->notes[0].rating, 16e5, 1e-12);
    assert_close(m->notes[0].surge_rating, 20e5, 1e-12);
    assert_close(m->notes[0].test_rating, 16e5, 1e-12); /* as in service */
    assert_string_equal(m->notes[0].standard, "EN 1092-2, PN 16");
    assert_close(m->asked.lowest_steady, 1.4e5, 1e-12);
    assert_close(m->asked.lowest[KENT_RECURRING], 0.2e5, 1e-12);
    assert_within(m->asked.lowest[KENT_OCCASIONAL], 0.0, 0.0);
    assert_close(m->asked.lowest[KENT_EXCEPTIONAL], -0.4e5, 1e-12);
    assert_close(m->asked.life, 50.0 * 365.2422 * 86400.0, 1e-6); /* tropical years */
    kent_model_free(m);

    m = read_sound(c, DESIGN_CASE);
    assert_true(isnan(m->pipes[0].joint_rating) && isnan(m->notes[0].rating));
    assert_true(isnan(m->scenarios[0].cycles_per_day) && isnan(m->asked.life));
    assert_true(isnan(m->asked.lowest_steady) && isnan(m->asked.lowest[0]));
    kent_model_free(m);
    free(text);
    free(rated);
    free(often);
    free(joints);
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_bearing_is_known_in_one_of_four_ways),
        cmocka_unit_test(a_soil_says_where_its_values_come_from),
        cmocka_unit_test(the_bearing_of_a_row_is_assumed_in_its_own_way),
        cmocka_unit_test(a_bearing_that_cannot_be_known_is_refused),
        cmocka_unit_test(zones_of_ground_arrive),
        cmocka_unit_test(what_is_asked_of_pressures_arrives),
        cmocka_unit_test(an_obstacle_lies_sideways),
        cmocka_unit_test(branches_and_roles_arrive),
        cmocka_unit_test(an_open_branch_without_a_bore_is_as_wide_as_it_is),
        cmocka_unit_test(each_word_of_a_role_is_read),
        cmocka_unit_test(a_straight_is_a_type_and_no_role),
        cmocka_unit_test(points_may_be_held_together),
        cmocka_unit_test(tests_are_stated_or_found_by_a_rule),
        cmocka_unit_test(each_fault_gets_its_one_complaint),
        cmocka_unit_test(a_surge_to_test_by_needs_scenarios),
        cmocka_unit_test(what_needs_a_main_is_refused_beside_ports),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
