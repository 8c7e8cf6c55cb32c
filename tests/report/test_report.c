#include "kent_check.h"
#include "kent_mixed.h"
#include "kent_worked.h"

#include <jansson.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

/* ---- printed text ---------------------------------------------------------------- */

/* Fails, showing the line, where one is wider than a hundred columns. */
static void assert_narrow(const char *text)
{
    for (const char *s = text; *s != '\0';) {
        const size_t length = strcspn(s, "\n");
        char line[4096];
        assert_true(length < sizeof line);
        memcpy(line, s, length);
        line[length] = '\0';
        if (kent_text_columns(line) > 100) fail_msg("too wide:\n%s", line);
        s += length + (s[length] == '\n');
    }
}

static void assert_contains(const char *text, const char *words)
{
    if (!strstr(text, words)) fail_msg("'%s' is not in:\n%s", words, text);
}

static void nothing_printed_is_wider_than_a_hundred_columns(void **state)
{
    (void)state;
    for (int long_names = 0; long_names < 2; long_names++) {
        kent_mixed mixed = kent_mixed_new(long_names == 1);
        for (kent_system units = KENT_SI; units <= KENT_US; units++) {
            const kent_report_options o = {.units = units};
            const kent_results *r = mixed.results;
            kent_text out = {0};
            const kent_sink sink = kent_mixed_sink(&out);
            assert_int_equal(kent_report_tables(r, &o, sink), KENT_OK);
            assert_narrow(kent_text_of(&out));
            kent_text_reset(&out);
            assert_int_equal(kent_report_check(r->model, r->steadies, &o, sink),
                             KENT_OK);
            assert_narrow(kent_text_of(&out));
            kent_text_clear(&out);
        }
        kent_mixed_clear(&mixed);
    }
}

static void wide_cuts_nothing_short(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(true);
    const kent_report_options o = {.units = KENT_SI, .wide = true};
    kent_text out = {0};
    assert_int_equal(kent_report_tables(mixed.results, &o, kent_mixed_sink(&out)),
                     KENT_OK);
    assert_null(strstr(kent_text_of(&out), "…"));
    for (size_t i = 0; i < mixed.build.model->fitting_count; i++) {
        assert_contains(kent_text_of(&out), mixed.build.model->fittings[i].id);
    }
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

static void the_tables_say_what_an_engineer_must_know(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_report_options o = {.units = KENT_SI};
    kent_text out = {0};
    assert_int_equal(kent_report_tables(mixed.results, &o, kent_mixed_sink(&out)),
                     KENT_OK);
    const char *text = kent_text_of(&out);
    assert_contains(text, "Tarnhöllow trunk main");
    assert_contains(text, "10 fittings · 2 scenarios");
    assert_contains(text, "none: peat");
    assert_contains(text, "joint takes it");
    assert_contains(text, "reducer to 400");
    assert_contains(text,
                    "gravity "); /* the crest's weight, and beside it on a line of */
    assert_contains(text, " face "); /* its own the face that takes the sideways part */
    assert_contains(text, "1 value assumed");
    assert_contains(text, "two surveys disagree, says the case");
    assert_contains(text, "competent, licensed engineers");
    assert_contains(text, "Outlet shut?in 6 s"); /* a line break in a title */
    assert_contains(text, "*  the load case that governs");
    assert_null(strstr(text, "OK"));
    assert_null(strstr(text, "complian"));
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

/* A rating is a column where a pipe has it and something is held against it. */
/* Who it is for, who made it, who judges and where it is signed, on every sheet. */
static void sheets_say_whose_they_are(void **state)
{
    (void)state;
    for (int named = 0; named < 2; named++) {
        kent_mixed mixed = kent_mixed_new(false);
        const kent_report_options o = {.units = KENT_SI};
        const kent_results *r = mixed.results;
        kent_text tables = {0}, sheet = {0};
        if (named) {
            kent_project *p = &mixed.build.model->project;
            (void)snprintf(p->number, sizeof p->number, "24-117");
            (void)snprintf(p->checker, sizeof p->checker, "M. Roe");
            (void)snprintf(p->codes, sizeof p->codes, "EN 805:2025");
        }
        assert_int_equal(kent_report_tables(r, &o, kent_mixed_sink(&tables)), KENT_OK);
        assert_int_equal(kent_report_explain(r, 0, &o, kent_mixed_sink(&sheet)),
                         KENT_OK);
        const char *texts[] = {kent_text_of(&tables), kent_text_of(&sheet)};
        for (size_t i = 0; i < 2; i++) {
            static const char WHOSE[] = "\nproject 24-117, checked by M. Roe\n";
            assert_int_equal(strstr(texts[i], WHOSE) != NULL, named);
            assert_int_equal(strstr(texts[i], "   Seal ____") != NULL, named);
            assert_int_equal(strstr(texts[i], "as prevailing: EN 805:2025") != NULL,
                             named);
            assert_contains(texts[i], "for competent, licensed engineers");
        }
        assert_narrow(texts[0]);
        assert_narrow(texts[1]);
        kent_text_clear(&tables);
        kent_text_clear(&sheet);
        kent_mixed_clear(&mixed);
    }
}

static void ratings_have_columns_where_something_is_held_against_them(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    kent_model *m = mixed.build.model;
    const kent_report_options o = {.units = KENT_SI};
    for (int given = 0; given < 2; given++) {
        for (int recurs = 0; recurs < 2; recurs++) {
            const double rating = given ? 27e5 : (double)NAN;
            kent_text out = {0};
            m->scenarios[1].class_of = recurs ? KENT_RECURRING : KENT_OCCASIONAL;
            m->pipes[0].surge_rating = m->pipes[0].test_rating = rating;
            m->pipes[0].recurring_rating = rating;
            assert_int_equal(
                kent_report_tables(mixed.results, &o, kent_mixed_sink(&out)), KENT_OK);
            const char *text = kent_text_of(&out);
            assert_int_equal(strstr(text, " +surge") != NULL, given);
            assert_int_equal(strstr(text, " tested") != NULL, given);
            assert_int_equal(strstr(text, " +often") != NULL, given && recurs);
            kent_text_clear(&out);
        }
    }
    kent_mixed_clear(&mixed);
}

static void what_cannot_be_held_stands_first(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_report_options o = {.units = KENT_SI};
    kent_text out = {0};
    assert_int_equal(kent_report_tables(mixed.results, &o, kent_mixed_sink(&out)),
                     KENT_OK);
    const char *text = kent_text_of(&out);
    const char *peat = strstr(text, " PT "), *first = strstr(text, " CR ");
    assert_true(mixed.results->restraints->not_held > 0);
    assert_true(peat && first && peat < first);
    assert_contains(text, "\na  ");
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

static void every_line_of_a_hand_calculation_can_be_worked_out_again(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const size_t count = mixed.build.model->fitting_count;
    for (kent_system units = KENT_SI; units <= KENT_US; units++) {
        const kent_report_options o = {.units = units};
        for (size_t f = 0; f < count; f++) {
            kent_text out = {0};
            const kent_sink sink = kent_mixed_sink(&out);
            assert_int_equal(kent_report_explain(mixed.results, (int)f, &o, sink),
                             KENT_OK);
            const char *text = kent_text_of(&out);
            assert_true(kent_worked_check(text) >= 3);
            assert_narrow(text);
            assert_contains(text, "Load cases");
            assert_contains(text, "What it needs from you");
            assert_contains(text, "gravity = 9.80665 m/s2");
            kent_text_clear(&out);
        }
    }
    kent_mixed_clear(&mixed);
}

static void check_lists_all_that_was_understood(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_report_options o = {.units = KENT_US};
    const kent_model *m = mixed.build.model;
    kent_text out = {0};
    const kent_sink sink = kent_mixed_sink(&out);
    assert_int_equal(kent_report_check(m, mixed.results->steadies, &o, sink), KENT_OK);
    for (size_t i = 0; i < m->point_count; i++) {
        assert_contains(kent_text_of(&out), m->points[i].id);
    }
    for (size_t i = 0; i < m->span_count; i++) {
        assert_contains(kent_text_of(&out), m->spans[i].id);
    }
    assert_contains(kent_text_of(&out), "gravity = 9.80665 m/s2");
    kent_text_reset(&out);
    assert_int_equal(kent_report_check(m, NULL, &o, sink), KENT_OK);
    assert_contains(kent_text_of(&out), "The main, point by point");
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

/* ---- JSON ------------------------------------------------------------------------ */

/* Where a key must stand: "steady[].points[].id"; [] means every element, of which
 * there must be at least one. */
static const char *const KEYS[] = {
    "format",
    "program",
    "version",
    "title",
    "project.number",
    "project.codes",
    "case_checksum",
    "water.density_kgm3",
    "water.bulk_modulus_Pa",
    "water.viscosity_Pas",
    "water.vapour_pressure_Pa",
    "water.sound_speed_ms",
    "steady[].state",
    "steady[].points[].id",
    "steady[].points[].head_m",
    "steady[].points[].pressure_Pa",
    "steady[].pipes[].id",
    "steady[].pipes[].flow_m3s",
    "steady[].pipes[].velocity_ms",
    "steady[].pipes[].wave_speed_ms",
    "steady[].pipes[].wave_speed_used_ms",
    "steady[].pipes[].reaches",
    "scenarios[].id",
    "scenarios[].state",
    "scenarios[].time_step_s",
    "scenarios[].time_steps",
    "scenarios[].numerical_uncertainty_m",
    "scenarios[].points[].id",
    "scenarios[].points[].highest_head_m",
    "scenarios[].points[].highest_at_s",
    "scenarios[].points[].lowest_head_m",
    "scenarios[].points[].lowest_at_s",
    "scenarios[].points[].highest_pressure_Pa",
    "scenarios[].points[].lowest_pressure_Pa",
    "scenarios[].points[].cavity_m3",
    "scenarios[].cavity_places",
    "scenarios[].cavities",
    "fittings[].id",
    "fittings[].at",
    "fittings[].pipe",
    "fittings[].type",
    "fittings[].angle_deg",
    "fittings[].curve",
    "fittings[].members",
    "fittings[].branch",
    "fittings[].role",
    "fittings[].load_case",
    "fittings[].sense",
    "fittings[].state",
    "fittings[].scenario",
    "fittings[].time_s",
    "fittings[].pressure_Pa",
    "fittings[].thrust_N[]",
    "fittings[].resultant_thrust_N",
    "fittings[].horizontal_N",
    "fittings[].vertical_N",
    "fittings[].safety_factor",
    "fittings[].design_thrust_N",
    "fittings[].factor_reached",
    "fittings[].load_cases[].name",
    "fittings[].load_cases[].pressure_Pa",
    "fittings[].load_cases[].thrust_N[]",
    "fittings[].load_cases[].safety_factor",
    "fittings[].load_cases[].design_thrust_N",
    "fittings[].runner_up",
    "fittings[].other_ways",
    "fittings[].block.type",
    "fittings[].block.bearing_area_m2",
    "fittings[].block.width_m",
    "fittings[].block.height_m",
    "fittings[].block.thickness_m",
    "fittings[].block.volume_m3",
    "fittings[].block.bearing_pressure_Pa",
    "fittings[].block.utilisation",
    "fittings[].block.face",
    "fittings[].ports[].direction[]",
    "fittings[].ports[].pressure_Pa",
    "fittings[].ports[].flow_m3s",
    "fittings[].ports[].push_N",
    "fittings[].restrained_length_m",
    "fittings[].restrained",
    "fittings[].cautions",
    "completeness[].load_case",
    "completeness[].present",
    "completeness[].waived",
    "assumed[].what",
    "assumed[].value",
    "assumed[].why",
    "cautions[]",
};

/* The same of lists that may be empty: one element at least must be seen in all. */
static const char *const LEG_KEYS[] = {"direction", "length_m", "pipes"};
static const char *const FACE_KEYS[] = {"width_m", "height_m", "thickness_m"};

/* Fails unless path leads somewhere from value in every branch. As deep as the path. */
/* NOLINTNEXTLINE(misc-no-recursion) */
/* A main with a hydrant on a flanged branch in mid-run: its JSON as text, and its CSV.
 */
static void hydrant_main(kent_text *json, kent_text *csv)
{
    kent_build b = kent_build_new();
    kent_error err = {0};
    kent_results *r = NULL;
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "H", 100.0, 0.0, 10.0);
    kent_build_point(&b, "E", 300.0, 0.0, 10.0);
    kent_build_pipe(&b, "A", "R H E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 40.0);
    const int note = kent_build_note(&b, "H");
    b.model->notes[note].role = KENT_ROLE_HYDRANT;
    b.model->notes[note].branch = (kent_branch){.end = KENT_BRANCH_BLANK,
                                                .direction = {0.0, -1.0, 0.0},
                                                .outside_diameter = 0.118,
                                                .inside_diameter = 0.1,
                                                .joint = KENT_FLANGED};
    kent_build_derive(&b);
    if (kent_job_run(b.model, &(kent_job_options){.threads = 1}, &r, &err)) {
        fail_msg("%s: %s", err.where, err.what);
    }
    const kent_report_options o = {.units = KENT_SI};
    assert_int_equal(kent_report_json(r, kent_mixed_sink(json)), KENT_OK);
    assert_int_equal(kent_report_summary_csv(r, &o, kent_mixed_sink(csv)), KENT_OK);
    kent_results_free(r);
    kent_build_clear(&b);
}

static void what_a_fitting_serves_stands_in_json_and_csv(void **state)
{
    (void)state;
    kent_text text = {0}, csv = {0};
    hydrant_main(&text, &csv);
    json_t *all = json_loads(kent_text_of(&text), 0, NULL);
    const json_t *h = json_array_get(json_object_get(all, "fittings"), 0);
    assert_string_equal(json_string_value(json_object_get(h, "type")), "tee");
    assert_string_equal(json_string_value(json_object_get(h, "role")), "hydrant");
    const json_t *branch = json_object_get(h, "branch");
    assert_string_equal(json_string_value(json_object_get(branch, "end")), "blank");
    assert_string_equal(json_string_value(json_object_get(branch, "joint")), "flanged");
    assert_close(json_number_value(json_object_get(branch, "outside_diameter_m")),
                 0.118, 1e-15);
    assert_int_equal(json_array_size(json_object_get(h, "members")), 0);
    assert_true(json_is_null(json_object_get(h, "curve")));
    assert_contains(kent_text_of(&csv), ",hydrant,blank,,,");
    json_decref(all);
    kent_text_clear(&text);
    kent_text_clear(&csv);
}

/* NOLINTNEXTLINE(misc-no-recursion): as deep as a path has dots */
static void walk(const json_t *value, const char *path, const char *whole)
{
    if (*path == '\0') return;
    if (path[0] == '[') {
        const char *rest = path[2] == '.' ? path + 3 : path + 2;
        size_t index = 0;
        json_t *element = NULL;
        if (!json_is_array(value) || json_array_size(value) == 0) {
            fail_msg("%s: no list, or an empty one", whole);
        }
        json_array_foreach(value, index, element) { walk(element, rest, whole); }
        return;
    }
    char key[64];
    const size_t length = strcspn(path, ".[");
    assert_true(length < sizeof key);
    memcpy(key, path, length);
    key[length] = '\0';
    const json_t *next = json_object_get(value, key);
    if (!next) fail_msg("%s: no key '%s'", whole, key);
    walk(next, path[length] == '.' ? path + length + 1 : path + length, whole);
}

static json_t *written(const kent_results *r)
{
    kent_text out = {0};
    json_error_t error;
    assert_int_equal(kent_report_json(r, kent_mixed_sink(&out)), KENT_OK);
    json_t *root = json_loads(kent_text_of(&out), JSON_REJECT_DUPLICATES, &error);
    if (!root) fail_msg("line %d: %s", error.line, error.text);
    kent_text_clear(&out);
    return root;
}

/* A station with a closed form: 70 m at no flow, 50 m of them left at its rated flow.
 */
static void a_pumps_duty_stands_in_the_steady_state(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_error err = {0};
    kent_steady *steady = NULL;
    kent_build_point(&b, "P", 0.0, 0.0, 10.0);
    kent_build_point(&b, "R", 300.0, 0.0, 10.0);
    kent_build_pipe(&b, "A", "P R", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 62.0);
    const int p = kent_build_pump(&b, "PS", "P", NULL, 70.0, 0.08, 50.0);
    b.model->pumps[p].suction_level = 12.0;
    b.model->pumps[p].in_parallel = b.model->pumps[p].running = 2;
    kent_build_relief_valve(&b, "RV", "P", 9e5, 0.01);
    kent_build_derive(&b);
    if (kent_steady_solve(b.model, &steady, &err)) fail_msg("%s", err.what);
    kent_loads_result loads = {
        .test = {.rule = KENT_TEST_FIXED, .pressure = (double)NAN}};
    kent_restraints restraints = {0};
    kent_results r = {.model = b.model,
                      .steadies = &steady,
                      .steady_count = 1,
                      .loads = &loads,
                      .restraints = &restraints};
    b.model->fitting_count = 0; /* only what flows is looked at */
    json_t *all = written(&r);
    const json_t *flow = json_array_get(json_object_get(all, "steady"), 0);
    const json_t *devices = json_object_get(flow, "devices");
    const json_t *pump = json_array_get(devices, 0),
                 *valve = json_array_get(devices, 1);
    assert_int_equal(json_array_size(devices), 2);
    assert_string_equal(json_string_value(json_object_get(pump, "id")), "PS");
    assert_string_equal(json_string_value(json_object_get(pump, "kind")), "pump");
    assert_int_equal(json_integer_value(json_object_get(pump, "running")), 2);
    assert_close(json_number_value(json_object_get(pump, "flow_m3s")), 0.16, 1e-9);
    assert_close(json_number_value(json_object_get(pump, "lift_m")), 50.0, 1e-9);
    /* rho g Q H over the rated efficiency of 0.8 */
    assert_close(json_number_value(json_object_get(pump, "power_W")),
                 9806.65 * 0.16 * 50.0 / 0.8, 1e-6);
    assert_true(json_number_value(json_object_get(valve, "flow_m3s")) == 0.0);
    json_decref(all);
    kent_steady_free(steady);
    kent_build_clear(&b);
}

static void every_key_of_the_results_is_there(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    json_t *root = written(mixed.results);
    for (size_t i = 0; i < sizeof KEYS / sizeof KEYS[0]; i++) {
        walk(root, KEYS[i], KEYS[i]);
    }
    json_decref(root);
    kent_mixed_clear(&mixed);
}

/* Of every fitting; bearing where a face leans on ground. */
static void ground_and_neighbours_have_their_keys(void **state)
{
    (void)state;
    static const char *const of_bearing[] = {
        "on_fill",    "depth_m",         "water_table_m",  "effective_stress_Pa",
        "falls_deg",  "passive_force_N", "active_force_N", "factor_inside",
        "cohesion_Pa"};
    kent_mixed mixed = kent_mixed_new(false);
    json_t *root = written(mixed.results);
    json_t *fitting = NULL, *way = NULL;
    size_t index = 0, k = 0, decide = 0, seen = 0;
    json_array_foreach(json_object_get(root, "fittings"), index, fitting)
    {
        const json_t *ground = json_object_get(fitting, "ground");
        const json_t *bearing = json_object_get(ground, "bearing");
        assert_true(json_is_array(json_object_get(ground, "neighbours")));
        walk(ground, "block_share", "ground");
        walk(ground, "joints_share", "ground");
        if (json_is_null(bearing)) continue;
        seen++;
        for (size_t i = 0; i < sizeof of_bearing / sizeof of_bearing[0]; i++) {
            walk(bearing, of_bearing[i], "bearing");
        }
        json_array_foreach(json_object_get(bearing, "ways"), k, way)
        {
            decide += json_is_true(json_object_get(way, "decides")) ? 1 : 0;
            assert_true(json_real_value(json_object_get(way, "bearing_Pa")) > 0.0);
            assert_true(json_real_value(json_object_get(way, "area_m2")) > 0.0);
            walk(way, "passive_coefficient", "way");
        }
    }
    assert_true(seen > 0);
    assert_int_equal(decide, seen);
    json_decref(root);
    kent_mixed_clear(&mixed);
}

static void legs_and_faces_have_their_keys(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    json_t *root = written(mixed.results);
    size_t index = 0, legs = 0, faces = 0, k = 0;
    json_t *fitting = NULL, *leg = NULL;
    json_array_foreach(json_object_get(root, "fittings"), index, fitting)
    {
        const json_t *face = json_object_get(json_object_get(fitting, "block"), "face");
        json_array_foreach(json_object_get(fitting, "restrained"), k, leg)
        {
            for (size_t i = 0; i < sizeof LEG_KEYS / sizeof LEG_KEYS[0]; i++) {
                walk(leg, LEG_KEYS[i], "restrained");
            }
            legs++;
        }
        if (json_is_null(face)) continue;
        for (size_t i = 0; i < sizeof FACE_KEYS / sizeof FACE_KEYS[0]; i++) {
            walk(face, FACE_KEYS[i], "face");
        }
        faces++;
    }
    assert_true(legs > 0 && faces > 0);
    json_decref(root);
    kent_mixed_clear(&mixed);
}

static void a_number_comes_back_with_every_bit(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    json_t *root = written(mixed.results);
    const json_t *scenario = json_array_get(json_object_get(root, "scenarios"), 0);
    const json_t *points = json_object_get(scenario, "points");
    for (size_t i = 0; i < json_array_size(points); i++) {
        const json_t *head =
            json_object_get(json_array_get(points, i), "highest_head_m");
        const double got = json_real_value(head);
        const double want = mixed.results->scenarios[0].points[i].highest_head;
        assert_memory_equal(&got, &want, sizeof got);
    }
    json_decref(root);
    kent_mixed_clear(&mixed);
}

static void a_value_that_is_not_there_is_null(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    json_t *root = written(mixed.results);
    const json_t *fittings = json_object_get(root, "fittings");
    const size_t count = json_array_size(fittings);
    assert_int_equal(count, mixed.build.model->fitting_count);
    const json_t *own = json_array_get(fittings, count - 1); /* ports-only come last */
    assert_string_equal(json_string_value(json_object_get(own, "id")), "B7");
    assert_true(json_is_null(json_object_get(own, "at")));
    assert_true(json_is_null(json_object_get(own, "scenario")));
    assert_true(json_is_null(json_object_get(own, "time_s")));
    assert_true(json_is_null(json_object_get(own, "station_m")));
    json_decref(root);
    kent_mixed_clear(&mixed);
}

/* ---- CSV ------------------------------------------------------------------------- */

/* The next field of a record (RFC 4180) into out; returns what follows it: ',', '\n' or
 * '\0'. */
static char next_field(const char **at, kent_text *out)
{
    const char *s = *at;
    kent_text_reset(out);
    if (*s == '"') {
        for (s++; *s != '"' || s[1] == '"'; s++) {
            assert_true(*s != '\0');
            if (*s == '"') s++;
            kent_text_add(out, "%c", *s);
        }
        s++;
    } else {
        const size_t length = strcspn(s, ",\n");
        assert_null(memchr(s, '"', length)); /* a quote inside asks for quotes around */
        kent_text_add(out, "%.*s", (int)length, s);
        s += length;
    }
    const char end = *s;
    *at = end == '\0' ? s : s + 1;
    return end;
}

/* Fields of each record must be as many as the first's; returns the records. */
static size_t count_records(const char *text, size_t *fields)
{
    size_t records = 0, here = 0;
    kent_text field = {0};
    *fields = 0;
    for (const char *at = text; *at != '\0';) {
        const char end = next_field(&at, &field);
        here++;
        if (end == ',') continue;
        if (records++ == 0) *fields = here;
        assert_int_equal(here, *fields);
        here = 0;
    }
    kent_text_clear(&field);
    return records;
}

static void the_summary_has_a_record_for_each_fitting(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_model *m = mixed.build.model;
    for (kent_system units = KENT_SI; units <= KENT_US; units++) {
        const kent_report_options o = {.units = units};
        kent_text out = {0}, field = {0};
        size_t fields = 0;
        const kent_sink sink = kent_mixed_sink(&out);
        assert_int_equal(kent_report_summary_csv(mixed.results, &o, sink), KENT_OK);
        const char *text = kent_text_of(&out);
        assert_int_equal(count_records(text, &fields), m->fitting_count + 1);
        assert_true(fields >= 45);
        assert_contains(text, units == KENT_SI ? "pressure [bar]" : "pressure [psi]");
        const char *at = strchr(text, '\n') + 1;
        for (size_t i = 0; i < m->fitting_count; i++) { /* second field: the point */
            (void)next_field(&at, &field);
            (void)next_field(&at, &field);
            assert_string_equal(kent_text_of(&field), m->fittings[i].id);
            while (next_field(&at, &field) == ',') {
            }
        }
        kent_text_clear(&field);
        kent_text_clear(&out);
    }
    kent_mixed_clear(&mixed);
}

static void a_history_has_three_columns_for_each_place(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_results *r = mixed.results;
    kent_text out = {0};
    size_t fields = 0;
    assert_int_equal(kent_report_history_csv(r, 0, kent_mixed_sink(&out)), KENT_OK);
    assert_int_equal(count_records(kent_text_of(&out), &fields),
                     r->scenarios[0].history.rows + 1);
    assert_int_equal(fields, 1 + 3 * r->history_count);
    assert_contains(kent_text_of(&out), "CR.head_m,CR.pressure_Pa,CR.flow_m3s");
    assert_contains(kent_text_of(&out), "\"T, 1.head_m\"");
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

static void a_profile_runs_along_every_pipe_without_a_step_back(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_results *r = mixed.results;
    size_t rows = 0, fields = 0;
    for (size_t i = 0; i < r->model->span_count; i++) {
        rows += (size_t)r->scenarios[1].grid->reaches[i] + 1;
    }
    kent_text out = {0};
    assert_int_equal(kent_report_profile_csv(r, 1, kent_mixed_sink(&out)), KENT_OK);
    assert_int_equal(count_records(kent_text_of(&out), &fields), rows + 1);
    assert_int_equal(fields, 6);
    double before = -1.0;
    char pipe[KENT_ID] = "";
    kent_text field = {0};
    const char *at = strchr(kent_text_of(&out), '\n') + 1;
    while (*at != '\0') {
        double n[6] = {0};
        (void)next_field(&at, &field);
        if (strcmp(pipe, kent_text_of(&field)) != 0) before = -1.0;
        (void)snprintf(pipe, sizeof pipe, "%s", kent_text_of(&field));
        for (size_t k = 1; k < 6; k++) {
            (void)next_field(&at, &field);
            n[k] = strtod(kent_text_of(&field), NULL);
        }
        assert_true(n[1] > before);
        assert_true(n[5] <= n[3] + 1e-6 && n[3] <= n[4] + 1e-6); /* low, steady, high */
        before = n[1];
    }
    kent_text_clear(&field);
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

/* ---- sinks that refuse ----------------------------------------------------------- */

static int refuse(void *to, const char *text, size_t length)
{
    (void)text;
    size_t *left = to;
    if (length > *left) return -1;
    *left -= length;
    return 0;
}

static void a_sink_that_is_full_makes_every_report_fail(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_results *r = mixed.results;
    const kent_report_options o = {.units = KENT_SI};
    for (size_t room = 0; room <= 400; room += 200) {
        size_t left[6] = {room, room, room, room, room, room};
        const kent_sink sinks[6] = {{refuse, &left[0]}, {refuse, &left[1]},
                                    {refuse, &left[2]}, {refuse, &left[3]},
                                    {refuse, &left[4]}, {refuse, &left[5]}};
        assert_int_equal(kent_report_tables(r, &o, sinks[0]), KENT_E_IO);
        assert_int_equal(kent_report_summary_csv(r, &o, sinks[1]), KENT_E_IO);
        assert_int_equal(kent_report_json(r, sinks[2]), KENT_E_IO);
        assert_int_equal(kent_report_history_csv(r, 0, sinks[3]), KENT_E_IO);
        assert_int_equal(kent_report_profile_csv(r, 0, sinks[4]), KENT_E_IO);
        assert_int_equal(kent_report_explain(r, 0, &o, sinks[5]), KENT_E_IO);
    }
    kent_mixed_clear(&mixed);
}

/* ---- catalogue ------------------------------------------------------------------- */

static void the_catalogue_lists_each_row_with_its_source(void **state)
{
    (void)state;
    kent_catalogue *c = NULL;
    kent_complaints complaints = {0};
    kent_error err = {0};
    const kent_status status =
        kent_catalogue_read(KENT_SOURCE_DIR "/config", &c, &complaints, &err);
    if (status) fail_msg("%s %s %s", err.where, err.what, complaints.kept[0].what);
    for (kent_system units = KENT_SI; units <= KENT_US; units++) {
        const kent_report_options o = {.units = units};
        kent_text out = {0};
        const kent_choice all = {0};
        const kent_choice soils = {.part = "soils"};
        size_t rows = 0;
        assert_int_equal(
            kent_report_catalogue(c, &all, &o, kent_mixed_sink(&out), &rows), KENT_OK);
        assert_int_equal(rows, c->pipe_count + c->material_count + c->valve_count +
                                   c->soil_count + c->concrete_count + c->rule_count +
                                   3); /* characteristics of pumps */
        const char *text = kent_text_of(&out);
        assert_narrow(text);
        for (size_t i = 0; i < c->pipe_count; i++) {
            assert_contains(text, c->pipes[i].id);
        }
        for (size_t i = 0; i < c->soil_count; i++) {
            assert_contains(text, c->soils[i].id);
        }
        for (size_t i = 0; i < c->rule_count; i++) {
            assert_contains(text, c->rules[i].id);
        }
        assert_contains(text, "[1] ");
        kent_text_reset(&out);
        assert_int_equal(
            kent_report_catalogue(c, &soils, &o, kent_mixed_sink(&out), &rows),
            KENT_OK);
        assert_int_equal(rows, c->soil_count);
        assert_null(strstr(kent_text_of(&out), c->pipes[0].id));
        kent_text_clear(&out);
    }
    kent_catalogue_free(c);
}

static void words_choose_rows_of_the_catalogue(void **state)
{
    (void)state;
    static const struct {
        const char *part;
        const char *words[3];
        size_t word_count, rows;
        const char *holds;
    } ROWS[] = {{"pipes", {"C900", "12in"}, 2, 3, "PVC-C900-DR25-12in"},
                {"pipes", {"c900", "dr18", "8IN"}, 3, 1, "PVC-C900-DR18-8in"},
                {"pipes", {"dn100", "en 545"}, 2, 4, "DI-EN545-C100-DN100"},
                {"pipes", {"C900", "dr32", "48in"}, 3, 0, ""},
                {"pipes", {"C900", "dr32.5", "48in"}, 3, 1, "PVC-C900-DR32.5-48in"},
                {"pipes", {"C900", "5-48in"}, 2, 0, ""},
                {"pipes", {"EN 545", "DN600"}, 2, 5, "DI-EN545-C100-DN600"},
                {"soils", {"usda"}, 1, 4, "1200"},
                {"soils", {"building code", "sand-"}, 2, 1, "sand-SP-by-gradient-IBC"},
                {"valves", {"weisbach"}, 1, 3, "gate-circular"},
                {"rules", {"test"}, 1, 1, "under test 1.13"},
                {"rules", {"2280"}, 1, 1, "1.10 on bearings of the soils AS2280 alone"},
                {"pumps", {NULL}, 0, 3, "1.288"}, /* head of Suter-25, no flow */
                {"pumps", {"suter-147"}, 1, 1, "Chaudhry"},
                {"materials", {"plastic"}, 1, 0, ""},
                {NULL, {"derived"}, 1, 90 + 3 + 1, "Renton"}};
    kent_catalogue *c = NULL;
    kent_complaints complaints = {0};
    kent_error err = {0};
    const kent_report_options o = {.units = KENT_US};
    assert_int_equal(
        kent_catalogue_read(KENT_SOURCE_DIR "/config", &c, &complaints, &err), KENT_OK);
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_choice choice = {ROWS[i].part, ROWS[i].words, ROWS[i].word_count};
        kent_text out = {0};
        size_t rows = 0;
        assert_int_equal(
            kent_report_catalogue(c, &choice, &o, kent_mixed_sink(&out), &rows),
            KENT_OK);
        if (rows != ROWS[i].rows) print_error("%zu: %s\n", i, kent_text_of(&out));
        assert_int_equal(rows, ROWS[i].rows);
        assert_contains(kent_text_of(&out), ROWS[i].holds);
        assert_narrow(kent_text_of(&out));
        assert_int_equal(out.length > 0, rows > 0);
        kent_text_clear(&out);
    }
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(nothing_printed_is_wider_than_a_hundred_columns),
        cmocka_unit_test(wide_cuts_nothing_short),
        cmocka_unit_test(the_tables_say_what_an_engineer_must_know),
        cmocka_unit_test(sheets_say_whose_they_are),
        cmocka_unit_test(ratings_have_columns_where_something_is_held_against_them),
        cmocka_unit_test(what_cannot_be_held_stands_first),
        cmocka_unit_test(every_line_of_a_hand_calculation_can_be_worked_out_again),
        cmocka_unit_test(check_lists_all_that_was_understood),
        cmocka_unit_test(a_pumps_duty_stands_in_the_steady_state),
        cmocka_unit_test(every_key_of_the_results_is_there),
        cmocka_unit_test(ground_and_neighbours_have_their_keys),
        cmocka_unit_test(legs_and_faces_have_their_keys),
        cmocka_unit_test(a_number_comes_back_with_every_bit),
        cmocka_unit_test(a_value_that_is_not_there_is_null),
        cmocka_unit_test(what_a_fitting_serves_stands_in_json_and_csv),
        cmocka_unit_test(the_summary_has_a_record_for_each_fitting),
        cmocka_unit_test(a_history_has_three_columns_for_each_place),
        cmocka_unit_test(a_profile_runs_along_every_pipe_without_a_step_back),
        cmocka_unit_test(a_sink_that_is_full_makes_every_report_fail),
        cmocka_unit_test(the_catalogue_lists_each_row_with_its_source),
        cmocka_unit_test(words_choose_rows_of_the_catalogue),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
