/* Points, pipes and states from text to model: values, and what is refused. */
#include "case_text.h"

#include <math.h>

static void stations_turns_and_curves_arrive(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, MAIN_CASE);
    const double degree = acos(-1.0) / 180.0;
    assert_close(m->points[0].station, 100.0, 1e-15);
    assert_close(m->points[0].station_ahead, 2000.0, 1e-15);
    assert_close(m->points[1].turn, -30.0 * degree, 1e-12); /* + to the left */
    assert_close(m->points[1].ground_level, 32.0, 1e-15);
    assert_close(m->points[2].curve_radius, 250.0, 1e-15);
    assert_true(isnan(m->points[1].station_ahead));
    assert_true(isnan(m->points[0].turn));
    assert_true(isnan(m->points[0].curve_radius));
    assert_close(m->pipes[1].branch_turn, 40.0 * degree, 1e-12);
    assert_true(isnan(m->pipes[0].branch_turn));
    assert_close(m->gas_content, 0.002, 1e-15);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_rating_of_the_case_replaces_the_class_s(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, MAIN_CASE);
    const kent_pipe_class *row = kent_catalogue_pipe(c, "DI-EN545-C40-DN300");
    assert_close(m->pipes[0].pressure_rating, 16e5, 1e-12);
    assert_close(m->pipes[0].surge_rating, 19e5, 1e-12);
    assert_close(m->pipes[0].test_rating, 25e5, 1e-12);
    assert_close(m->pipes[1].pressure_rating, row->pressure_rating, 1e-15);
    assert_string_equal(m->pipes[1].standard, row->standard);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_standard_of_another_edition_is_cautioned(void **state)
{
    (void)state;
    static const struct {
        const char *own, *holds;
        size_t cautions;
    } ROWS[] = {{"EN 545", "EN 545:2010", 0},
                {"EN 545:2010", "EN 545:2010", 0},
                {"EN 545:2006", "EN 545:2006", 1},
                {"EN 54", "EN 54", 1}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char piece[80];
        (void)snprintf(piece, sizeof piece, "standard = \"%s\"; pressure_rating",
                       ROWS[i].own);
        char *text = replaced(MAIN_CASE, "pressure_rating", piece);
        kent_model *m = read_sound(c, text);
        assert_string_equal(m->pipes[0].standard, ROWS[i].holds);
        assert_int_equal(cautions_with(m, "two editions do not mix"), ROWS[i].cautions);
        kent_model_free(m);
        free(text);
    }
    kent_catalogue_free(c);
}

/* The catalogue with ductile iron made a plastic: shares 1.00 and 0.80 at 20 and 40
 * degC, one element of creep, and surge rated at 20 bar, 18 bar where it recurs. */
static kent_catalogue *with_a_plastic(void)
{
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < c->material_count; i++) {
        kent_material *m = &c->materials[i];
        if (strcmp(m->id, "ductile-iron") != 0) continue;
        m->plastic = true;
        m->derating_count = 2;
        m->derating[0] = (kent_derating){293.15, 1.0};
        m->derating[1] = (kent_derating){313.15, 0.8};
        m->creep_count = 1;
        m->creep[0] = (kent_creep){0.05, 1e-10};
        m->creep_temperature = 293.15;
    }
    for (size_t i = 0; i < c->pipe_count; i++) {
        if (strcmp(c->pipes[i].material, "ductile-iron") != 0) continue;
        c->pipes[i].surge_rating = 20e5;
        c->pipes[i].recurring_rating = 18e5;
        c->pipes[i].test_rating = NAN;
    }
    return c;
}

static kent_model *read_warm(const kent_catalogue *c, const char *temperature,
                             const char *ratings)
{
    char *warm = replaced(MAIN_CASE, "12 degC", temperature);
    char *text = replaced(warm,
                          "pressure_rating = \"16 bar\";\n    surge_rating = \"19 "
                          "bar\"; test_rating = \"25 bar\";",
                          ratings);
    kent_model *m = read_sound(c, text);
    free(warm);
    free(text);
    return m;
}

/* Half-way between 20 and 40 degC nine tenths are left. */
static void ratings_of_a_warm_plastic_are_reduced(void **state)
{
    (void)state;
    kent_catalogue *c = with_a_plastic();
    const kent_pipe_class *row = kent_catalogue_pipe(c, "DI-EN545-C40-DN300");
    kent_model *m = read_warm(c, "30 degC", "");
    assert_close(m->pipes[0].derating, 0.9, 1e-12);
    assert_close(m->pipes[0].pressure_rating, row->pressure_rating, 1e-15);
    assert_close(m->pipes[0].surge_rating, 20e5, 1e-15);
    assert_close(m->pipes[0].recurring_rating, 18e5, 1e-15);
    const char *note = assumed(m, "share of its ratings that ductile-iron keeps");
    assert_non_null(note);
    assert_memory_equal(note, "0.9\twater at 30 degC; catalogue (",
                        strlen("0.9\twater at 30 degC; catalogue ("));
    assert_int_equal(cautions_with(m, "taken to hold"), 0); /* none is the case's */
    kent_model_free(m);

    /* What the case rates holds as it stands, and nothing of the class beside it. */
    m = read_warm(c, "30 degC", "pressure_rating = \"16 bar\";");
    assert_close(m->pipes[0].pressure_rating * m->pipes[0].derating, 16e5, 1e-12);
    assert_true(isnan(m->pipes[0].surge_rating) && isnan(m->pipes[0].test_rating));
    assert_true(isnan(m->pipes[0].recurring_rating));
    assert_int_equal(
        cautions_with(m,
                      "pipe \"A\": the ratings that the case states are taken to hold "
                      "at the water's 30 degC; of what is rated cold ductile-iron "
                      "keeps a share of 0.9 there"),
        1);
    kent_model_free(m);

    /* A surge rating of the case's own says nothing of surges that recur. */
    m = read_warm(c, "30 degC",
                  "pressure_rating = \"16 bar\"; surge_rating = \"19 bar\";");
    assert_close(m->pipes[0].recurring_rating * m->pipes[0].derating, 16e5, 1e-12);
    kent_model_free(m);
    m = read_warm(c, "30 degC",
                  "pressure_rating = \"16 bar\"; surge_rating = \"19 bar\"; "
                  "recurring_rating = \"17 bar\";");
    assert_close(m->pipes[0].recurring_rating * m->pipes[0].derating, 17e5, 1e-12);
    kent_model_free(m);

    /* Where it rates surge alone, the rest is the class's, reduced. */
    m = read_warm(c, "30 degC", "surge_rating = \"19 bar\";");
    assert_close(m->pipes[0].surge_rating * m->pipes[0].derating, 19e5, 1e-12);
    assert_close(m->pipes[0].pressure_rating * m->pipes[0].derating,
                 0.9 * row->pressure_rating, 1e-12);
    kent_model_free(m);

    m = read_warm(c, "20 degC", "");
    assert_close(m->pipes[0].derating, 1.0, 1e-15);
    assert_null(assumed(m, "share of its ratings that ductile-iron keeps"));
    kent_model_free(m);

    m = read_warm(c, "20 degC", "pressure_rating = \"16 bar\";");
    assert_int_equal(cautions_with(m, "taken to hold"), 0);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void water_too_warm_for_a_plastic_is_refused(void **state)
{
    (void)state;
    kent_catalogue *c = with_a_plastic();
    char *warm = replaced(MAIN_CASE, "12 degC", "41 degC");
    assert_refused_at(
        c, warm, 12,
        "pipe \"B\": the water is too warm for ductile-iron: 41 degC, and "
        "its ratings end at 40 degC; give the pressure_rating that holds "
        "at this temperature, or take another material");
    char *text = replaced(warm, "left\";", "left\"; pressure_rating = \"6 bar\";");
    kent_model *m = read_sound(c, text);
    assert_close(m->pipes[1].pressure_rating * m->pipes[1].derating, 6e5, 1e-12);
    assert_true(isnan(m->pipes[1].surge_rating)); /* the class's does not hold */
    assert_int_equal(cautions_with(m, "pipe \"B\": the water, 41 degC, is warmer"), 1);
    kent_model_free(m);
    free(text);
    free(warm);
    kent_catalogue_free(c);
}

static void ratings_by_an_unstated_temperature_say_so(void **state)
{
    (void)state;
    kent_catalogue *c = with_a_plastic();
    char *text = replaced(MAIN_CASE, "temperature = \"12 degC\";",
                          "density = \"1000 kg/m^3\"; bulk_modulus = \"2.2 GPa\"; "
                          "viscosity = \"1 mPa s\"; vapour_pressure = \"2 kPa\";");
    kent_model *m = read_sound(c, text);
    assert_non_null(assumed(m, "water temperature"));
    kent_model_free(m);
    kent_catalogue_free(c);

    c = read_catalogue(); /* nothing of iron hangs on it */
    m = read_sound(c, text);
    assert_null(assumed(m, "water temperature"));
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

static void a_style_of_stations_that_is_not_shown_is_said(void **state)
{
    (void)state;
    static const struct {
        const char *head;
        size_t cautions;
    } ROWS[] = {
        {"format = 1; site = { station_style = \"km+m\"; };", 0},
        {"format = 1; units = \"US\"; site = { station_style = \"km+m\"; };", 1},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char *text = replaced(MAIN_CASE, "format = 1;", ROWS[i].head);
        kent_model *m = read_sound(c, text);
        assert_int_equal(cautions_with(m,
                                       "stations of the case are km+m, and are shown "
                                       "as 100ft+ft"),
                         ROWS[i].cautions);
        kent_model_free(m);
        free(text);
    }
    kent_catalogue_free(c);
}

static void creep_is_the_case_s_or_the_material_s(void **state)
{
    (void)state;
    static const char OWN[] = "creep = ( ( \"0.05 s\", \"1.057e-10 1/Pa\" ), ( \"0.5 "
                              "s\", \"1.054e-10 1/Pa\" ) ); pressure_rating";
    static const char UNUSED[] = "creep of pipe walls is read, but";
    kent_catalogue *c = with_a_plastic();
    kent_model *m = read_sound(c, MAIN_CASE);
    assert_int_equal(m->creep_count, 1); /* once for both pipes */
    assert_int_equal(m->pipes[1].creep_count, 1);
    assert_close(m->creep[m->pipes[1].creep_first].time, 0.05, 1e-15);
    assert_int_equal(cautions_with(m, UNUSED), 0);
    kent_model_free(m);

    char *text = replaced(MAIN_CASE, "pressure_rating", OWN);
    m = read_sound(c, text);
    const kent_pipe *a = &m->pipes[0], *b = &m->pipes[1];
    assert_int_equal(a->creep_count, 2);
    assert_close(m->creep[a->creep_first + 1].time, 0.5, 1e-15);
    assert_close(m->creep[a->creep_first + 1].compliance, 1.054e-10, 1e-12);
    assert_int_equal(b->creep_count, 1);
    assert_close(m->creep[b->creep_first].compliance, 1e-10, 1e-12);
    assert_int_equal(cautions_with(m, UNUSED), 1);
    kent_model_free(m);
    kent_catalogue_free(c);

    c = read_catalogue();
    assert_refused_at(
        c, text, 10,
        "pipe \"A\": creep is of plastic walls, and ductile-iron is none; "
        "leave it out, or name the material");
    free(text);
    kent_catalogue_free(c);
}

static void creep_is_asked_for_in_solver(void **state)
{
    (void)state;
    static const char ASKED[] =
        "solver = { creep = true; friction = \"unsteady\"; };\npoints";
    static const char OWN[] = "creep = ( ( \"0.05 s\", \"1.057e-10 1/Pa\" ) ); "
                              "pressure_rating";
    static const char UNUSED[] = "creep of pipe walls is read, but";
    static const char COLD[] =
        "of ductile-iron was found at 20 degC, and the water has "
        "12 degC: a colder wall creeps less";
    kent_catalogue *c = with_a_plastic();
    char *text = replaced(MAIN_CASE, "points", ASKED);
    char *own = replaced(text, "pressure_rating", OWN);
    kent_model *m = read_sound(c, text);
    assert_true(m->solver.creep);
    const char *note = assumed(m, "creep of ductile-iron");
    assert_non_null(note);
    assert_memory_equal(note, "1 element, 0.05 to 0.05 s\tcatalogue (", 37);
    assert_non_null(assumed(m, "friction of past accelerations"));
    assert_int_equal(cautions_with(m, COLD), 1);
    assert_int_equal(cautions_with(m, "were not measured on this pipe"), 1);
    kent_model_free(m);

    m = read_sound(c, own); /* of the other pipe it is still the material's */
    assert_int_equal(cautions_with(m, UNUSED), 0);
    assert_int_equal(cautions_with(m, COLD), 1);
    kent_model_free(m);

    for (size_t i = 0; i < c->material_count; i++) {
        c->materials[i].creep_temperature = 288.15; /* within 5 K */
    }
    m = read_sound(c, text);
    assert_int_equal(cautions_with(m, "was found at"), 0);
    kent_model_free(m);
    kent_catalogue_free(c);

    c = read_catalogue();
    m = read_sound(c, text);
    assert_int_equal(cautions_with(m, "no pipe has elements of creep"), 1);
    kent_model_free(m);
    m = read_sound(c, MAIN_CASE);
    assert_int_equal(cautions_with(m, "creep"), 0);
    assert_null(assumed(m, "friction of past accelerations"));
    kent_model_free(m);
    free(text);
    free(own);
    kent_catalogue_free(c);
}

static void states_hold_their_levels_and_factors(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, MAIN_CASE);
    assert_int_equal(m->state_count, 2);
    const kent_state *high = &m->states[0], *low = &m->states[1];
    assert_string_equal(low->id, "low");
    assert_int_equal(high->level_count, 0);
    assert_close(high->outflow_factor, 1.0, 1e-15);
    assert_close(high->roughness_factor, 1.0, 1e-15);
    assert_int_equal(low->level_count, 1);
    assert_int_equal(m->state_levels[low->level_first].fixed_level, 0);
    assert_close(m->state_levels[low->level_first].level, 76.5, 1e-15);
    assert_close(low->outflow_factor, 0.3, 1e-15);
    assert_close(low->roughness_factor, 1.2, 1e-15);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_scenario_starts_from_the_states_it_names(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, MAIN_CASE);
    const kent_scenario *a = &m->scenarios[0], *b = &m->scenarios[1];
    assert_int_equal(a->state_count, 1);
    assert_int_equal(m->scenario_states[a->state_first], 1);
    assert_int_equal(b->state_count, 2);
    assert_int_equal(m->scenario_states[b->state_first], 1);
    assert_int_equal(m->scenario_states[b->state_first + 1], 0);
    assert_int_equal(m->march_count, 3);
    assert_null(assumed(m, "states of scenarios that name none"));
    kent_model_free(m);

    char *text = replaced(MAIN_CASE, "states = [ \"low\" ];", "");
    m = read_sound(c, text);
    assert_int_equal(m->scenarios[0].state_count, 0);
    assert_int_equal(m->march_count, 4);
    assert_string_equal(assumed(m, "states of scenarios that name none"),
                        "all 2\tnot given");
    kent_model_free(m);
    free(text);

    text =
        replaced(SOUND_CASE, "scenarios", "states = ( { id = \"dry\"; } );\nscenarios");
    m = read_sound(c, text);
    assert_string_equal(m->states[0].id, "dry");
    assert_null(assumed(m, "states of scenarios that name none")); /* there is one */
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

/* A piece of MAIN_CASE, what stands in its place, and the one complaint. */
static const struct {
    const char *from, *to;
    int line;
    const char *what;
} FAULTS[] = {
    {"ground_level = \"32 m\";", "ground_level = \"32 m\"; cover = \"1 m\";", 6,
     "point \"K\": cover and ground_level are both given; keep one"},
    {"turn = \"30 deg right\";", "turn = \"30 deg right\"; x = \"0 m\"; y = \"0 m\";",
     5,
     "point \"K\": turn stands where there are no coordinates; x and y say how the "
     "route turns, so leave turn or x and y out"},
    {"turn = \"30 deg right\";", "x = \"0 m\";", 5,
     "point \"K\": x and y stand together: give both or neither"},
    {"station = \"0+100\";", "", 4,
     "point \"R\": station_ahead needs station, the station on arrival here"},
    {"( \"R\", \"76.5 m\" )", "( \"R\" )", 17,
     "state \"low\": element 1 of levels must be a pair, as ( \"R1\", \"1.4 m\" )"},
    {"( \"R\", \"76.5 m\" )", "\"R\"", 17,
     "state \"low\": element 1 of levels must be a pair, as ( \"R1\", \"1.4 m\" )"},
    {"( \"R\", \"76.5 m\" )", "( \"R1\", \"76.5 m\" )", 17,
     "state \"low\": levels: there is no fixed level at \"R1\"; did you mean \"R\"?"},
    {"( \"R\", \"76.5 m\" )", "( \"R\", 76.5 )", 17,
     "state \"low\": levels = 76.5 has no unit; write for instance \"1.4 m\" or \"4.5 "
     "ft\""},
    {"( \"R\", \"76.5 m\" )", "( \"R\", \"76.5 km\" )", 17,
     "state \"low\": levels: 76500.00 m is out of range; the range is -1000 to 9000 m"},
    {"( \"R\", \"76.5 m\" )", "( \"R\", \"76.5 m\" ), ( \"R\", \"70 m\" )", 17,
     "state \"low\": levels names \"R\" twice; keep one"},
    {"{ id = \"high\"; }", "{ id = \"high\"; }, { id = \"high\"; }", 16,
     "state \"high\" is given twice, first at line 16"},
    {"[ \"low\" ]", "[ \"lo\" ]", 20,
     "scenario \"a\": states: there is no state \"lo\"; did you mean \"low\"?"},
    {"[ \"low\" ]", "[ \"low\", \"low\" ]", 20,
     "scenario \"a\": states names \"low\" twice; keep one"},
    {"[ \"low\" ]", "[ ]", 20,
     "scenario \"a\": states is empty; leave it out to start from every state"},
    {"surge_rating",
     "creep = ( ( \"5 s\", \"1e-10 1/Pa\" ), ( \"1 s\", \"1e-10 1/Pa\" ) ); "
     "surge_rating",
     11,
     "pipe \"A\": pair 2 of creep: times must rise from above 0 s, compliances be "
     "above 0"},
    {"surge_rating", "creep = ( ( \"5 s\", 1e-10 ) ); surge_rating", 11,
     "pipe \"A\": creep = 1e-10 has no unit; write for instance \"1.06e-10 1/Pa\" or "
     "\"7.3e-7 1/psi\""},
    {"to = \"0 L/s\"", "to = 0.0", 21,
     "scenario \"a\": event 1: to = 0 has no unit; an outflow changes to a flow, for "
     "instance \"300 L/s\" or \"4800 gpm\""},
    {"at = \"R\"; level = \"80 m\"; }",
     "at = \"R\"; level = \"80 m\"; },\n { at = \"R\"; level = \"81 m\"; }", 15,
     "fixed level at \"R\" is given twice, first at line 14"},
};

static void each_fault_gets_its_one_complaint(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof FAULTS / sizeof FAULTS[0]; i++) {
        char *text = replaced(MAIN_CASE, FAULTS[i].from, FAULTS[i].to);
        assert_refused_at(c, text, FAULTS[i].line, FAULTS[i].what);
        free(text);
    }
    kent_catalogue_free(c);
}

static void a_pipe_between_coordinates_has_no_turn_of_its_own(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text =
        replaced(SOUND_CASE, "joint = \"push-on\";", "branch_turn = \"5 deg left\";");
    assert_refused_at(
        c, text, 9,
        "pipe \"A\": branch_turn stands where there are no coordinates; x "
        "and y of its points say which way it starts, so leave it out");
    free(text);
    kent_catalogue_free(c);
}

static void rules_that_the_catalogue_lacks_are_refused(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < c->rule_count; i++) {
        c->rules[i].id[0] = 'X';
    }
    assert_refused_at(
        c, SOUND_CASE, 1,
        "the catalogue has no set of rules \"common-practice\"; name one in "
        "design_rules");
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(stations_turns_and_curves_arrive),
        cmocka_unit_test(a_rating_of_the_case_replaces_the_class_s),
        cmocka_unit_test(a_standard_of_another_edition_is_cautioned),
        cmocka_unit_test(ratings_of_a_warm_plastic_are_reduced),
        cmocka_unit_test(water_too_warm_for_a_plastic_is_refused),
        cmocka_unit_test(ratings_by_an_unstated_temperature_say_so),
        cmocka_unit_test(creep_is_the_case_s_or_the_material_s),
        cmocka_unit_test(creep_is_asked_for_in_solver),
        cmocka_unit_test(states_hold_their_levels_and_factors),
        cmocka_unit_test(a_scenario_starts_from_the_states_it_names),
        cmocka_unit_test(a_style_of_stations_that_is_not_shown_is_said),
        cmocka_unit_test(each_fault_gets_its_one_complaint),
        cmocka_unit_test(rules_that_the_catalogue_lacks_are_refused),
        cmocka_unit_test(a_pipe_between_coordinates_has_no_turn_of_its_own),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
