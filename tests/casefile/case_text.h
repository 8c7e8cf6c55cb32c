/* For tests of the reader: a text as a file, and what was complained of it. */
#ifndef KENT_CASE_TEXT_H
#define KENT_CASE_TEXT_H

#include "kent_casefile.h"
#include "kent_check.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

/* A main that reads without complaint: three points, one pipe, one valve. */
static const char SOUND_CASE[] =
    "format = 1;\n"
    "title = \"Quarry lane\";\n"
    "points = (\n"
    "  { id = \"R1\"; x = \"0 m\"; y = \"0 m\"; z = \"50 m\"; },\n"
    "  { id = \"B1\"; x = \"400 m\"; y = \"0 m\"; z = \"30 m\"; },\n"
    "  { id = \"E1\"; x = \"700 m\"; y = \"300 m\"; z = \"20 m\"; }\n"
    ");\n"
    "pipes = ( { id = \"A\"; route = [ \"R1\", \"B1\", \"E1\" ];\n"
    "  pipe_class = \"DI-EN545-C40-DN300\"; joint = \"push-on\"; } );\n"
    "fixed_levels = ( { at = \"R1\"; level = \"80 m\"; } );\n"
    "valves = ( { id = \"V1\"; at = \"E1\"; type = \"butterfly\"; size = \"300 mm\";\n"
    "  flow = \"100 L/s\"; discharge_level = \"21 m\"; } );\n"
    "scenarios = ( { id = \"shut\"; duration = \"30 s\"; class = \"occasional\";\n"
    "  events = ( { valve = \"V1\"; start_time = \"1 s\"; ramp_time = \"10 s\"; to = "
    "0.0; "
    "} ); } );\n"
    "ground = { soil = \"sand-SP\"; cover = \"1.2 m\"; water_table = \"none\"; };\n"
    "loads = { test_pressure = \"12 bar\"; test_gauge_at = \"E1\"; safety_factor = "
    "1.5; "
    "};\n";

/* A main by its lengths alone, with a value at every key of points, pipes and states.
 */
static const char MAIN_CASE[] =
    "format = 1;\n"
    "water = { temperature = \"12 degC\"; gas_content = 0.002; };\n"
    "points = (\n"
    "  { id = \"R\"; z = \"50 m\"; station = \"0+100\"; station_ahead = \"2+000\"; },\n"
    "  { id = \"K\"; z = \"30 m\"; station = \"2+410\"; turn = \"30 deg right\";\n"
    "    ground_level = \"32 m\"; },\n"
    "  { id = \"W\"; z = \"25 m\"; station = \"2+600\"; curve_radius = \"250 m\"; "
    "turn = \"20 deg right\"; }, { id = \"E\"; z = \"25 m\"; station = \"2+800\"; }, "
    "{ id = \"F\"; z = \"25 m\"; station = \"2+900\"; } );\n"
    "pipes = (\n"
    "  { id = \"A\"; route = [ \"R\", \"K\", \"W\", \"E\" ]; length = \"800 m\";\n"
    "    pipe_class = \"DI-EN545-C40-DN300\"; pressure_rating = \"16 bar\";\n"
    "    surge_rating = \"19 bar\"; test_rating = \"25 bar\"; },\n"
    "  { id = \"B\"; route = [ \"E\", \"F\" ]; length = \"100 m\"; branch_turn = \"40 "
    "deg "
    "left\";\n"
    "    pipe_class = \"DI-EN545-C40-DN300\"; } );\n"
    "fixed_levels = ( { at = \"R\"; level = \"80 m\"; } );\n"
    "outflows = ( { at = \"F\"; flow = \"18 L/s\"; } );\n"
    "states = ( { id = \"high\"; },\n"
    "  { id = \"low\"; levels = ( ( \"R\", \"76.5 m\" ) ); outflow_factor = 0.3;\n"
    "    roughness_factor = 1.2; } );\n"
    "scenarios = (\n"
    "  { id = \"a\"; duration = \"30 s\"; states = [ \"low\" ];\n"
    "    events = ( { outflow = \"F\"; ramp_time = \"5 s\"; to = \"0 L/s\"; } ); },\n"
    "  { id = \"b\"; duration = \"30 s\"; states = ( \"low\", \"high\" );\n"
    "    events = ( { outflow = \"F\"; ramp_time = \"9 s\"; to = \"0 L/s\"; } ); } );\n"
    "fittings = ( { at = \"K\"; type = \"bend\"; } );\n";

/* The sound case with zones, an obstacle, a branch and a test by rule. */
static const char DESIGN_CASE[] =
    "format = 1;\n"
    "points = (\n"
    "  { id = \"R1\"; x = \"0 m\"; y = \"0 m\"; z = \"50 m\"; },\n"
    "  { id = \"T1\"; x = \"200 m\"; y = \"0 m\"; z = \"40 m\"; },\n"
    "  { id = \"B1\"; x = \"400 m\"; y = \"0 m\"; z = \"30 m\"; },\n"
    "  { id = \"E1\"; x = \"700 m\"; y = \"300 m\"; z = \"20 m\"; }\n"
    ");\n"
    "pipes = ( { id = \"A\"; route = [ \"R1\", \"T1\", \"B1\", \"E1\" ];\n"
    "  pipe_class = \"DI-EN545-C40-DN300\"; joint = \"push-on\"; } );\n"
    "fixed_levels = ( { at = \"R1\"; level = \"80 m\"; } );\n"
    "valves = ( { id = \"V1\"; at = \"E1\"; type = \"butterfly\"; size = \"300 mm\";\n"
    "  flow = \"100 L/s\"; discharge_level = \"21 m\"; } );\n"
    "scenarios = ( { id = \"shut\"; duration = \"30 s\"; class = \"occasional\";\n"
    "  events = ( { valve = \"V1\"; ramp_time = \"10 s\"; to = 0.0; } ); } );\n"
    "ground = { soil = \"sand-SP\"; cover = \"1.2 m\"; trench = \"type-2\"; };\n"
    "ground_zones = (\n"
    "  { pipe = \"A\"; from = \"0+100\"; to = \"0+250\"; soil = \"soft-clay-CH\"; },\n"
    "  { pipe = \"A\"; from = \"250 m\"; to = \"0+300\"; cover = \"2 m\"; water_table "
    "= "
    "\"0.5 m\"; trench = \"type-4\"; } );\n"
    "fittings = (\n"
    "  { at = \"B1\"; obstacles = (\n"
    "    { what = \"sewer\"; direction = [ 3.0, -4.0, 1.0 ]; distance = \"1.8 m\"; "
    "depth = \"2.5 m\"; } ); } );\n"
    "loads = { test_pressure = \"12 bar\"; test_gauge_at = \"E1\"; safety_factor = "
    "1.5;\n"
    "  future_pressure = \"9 bar\"; future_gauge_at = \"T1\"; };\n";

/* A main with every device and every kind of event. */
static const char DEVICE_CASE[] =
    "format = 1;\n"
    "points = (\n"
    "  { id = \"PH\"; x = \"0 m\"; y = \"0 m\"; z = \"40 m\"; },\n"
    "  { id = \"K1\"; x = \"100 m\"; y = \"0 m\"; z = \"42 m\"; },\n"
    "  { id = \"K2\"; x = \"400 m\"; y = \"0 m\"; z = \"50 m\"; },\n"
    "  { id = \"K3\"; x = \"800 m\"; y = \"0 m\"; z = \"60 m\"; },\n"
    "  { id = \"K4\"; x = \"1200 m\"; y = \"0 m\"; z = \"70 m\"; },\n"
    "  { id = \"R2\"; x = \"1500 m\"; y = \"0 m\"; z = \"95 m\"; } );\n"
    "pipes = ( { id = \"A\"; route = [ \"PH\", \"K1\", \"K2\", \"K3\", \"K4\", \"R2\" "
    "];\n"
    "  pipe_class = \"DI-EN545-C40-DN300\"; joint = \"push-on\"; } );\n"
    "fixed_levels = ( { at = \"R2\"; level = \"100 m\"; } );\n"
    "outflows = ( { at = \"K3\"; flow = \"5 L/s\"; } );\n"
    "pumps = (\n"
    "  { id = \"PS\"; at = \"PH\"; suction_level = \"41 m\"; in_parallel = 3; running "
    "= 2;\n"
    "    speed = \"1480 rpm\"; inertia = \"7.6 kg m^2\"; stages = 2; efficiency = "
    "0.84;\n"
    "    flow_head = ( ( \"0 L/s\", \"133 m\" ), ( \"137 L/s\", \"97.3 m\" ),\n"
    "      ( \"165 L/s\", \"81.3 m\" ) ); rated = ( \"137 L/s\", \"97.3 m\" );\n"
    "    check_valve = \"delayed\"; check_valve_delay = \"0.4 s\";\n"
    "    check_valve_loss = 1.5; check_valve_size = \"250 mm\"; },\n"
    "  { id = \"PB\"; at = \"K1\"; flow_to = \"K2\"; speed = \"970 rpm\"; suctions = "
    "2;\n"
    "    flow_head = ( ( \"0 L/s\", \"30 m\" ), ( \"40 L/s\", \"27 m\" ), ( \"80 "
    "L/s\", \"18 m\" ) );\n"
    "    flow_efficiency = ( ( \"0 L/s\", 0.0 ), ( \"50 L/s\", 0.7 ), ( \"100 L/s\", "
    "0.8 ) );\n"
    "    rated = ( \"60 L/s\", \"23.3 m\" ); } );\n"
    "check_valves = ( { id = \"NR\"; at = \"K2\"; flow_to = \"K3\"; size = \"300 mm\"; "
    "loss = 1.2; } );\n"
    "control_valves = ( { id = \"PR\"; at = \"K4\"; flow_to = \"R2\"; holds = "
    "\"upstream\";\n"
    "  set_pressure = \"4 bar\"; size = \"200 mm\"; kv = 600; opening_time = \"8 s\";\n"
    "  closure_time = \"9 s\"; } );\n"
    "surge_tanks = ( { id = \"ST\"; at = \"K3\"; area = \"20 m^2\"; bottom_level = "
    "\"60 m\";\n"
    "  connection_diameter = \"1 m\"; loss_in = 0.5; } );\n"
    "one_way_surge_tanks = ( { id = \"FT\"; at = \"K3\"; area = \"12 m^2\"; level = "
    "\"98 m\";\n"
    "  connection_diameter = \"300 mm\"; loss_out = 4.0; } );\n"
    "air_vessels = ( { id = \"VES1\"; at = \"K1\"; next_to = \"PH\"; total_volume = "
    "\"10 m^3\";\n"
    "  gas_volume = \"4.5 m^3\"; connection_diameter = \"300 mm\"; loss_in = 12.0;\n"
    "  loss_out = 5.0; } );\n"
    "relief_valves = ( { id = \"RV\"; at = \"K3\"; set_pressure = \"15 bar\";\n"
    "  full_open_pressure = \"16.5 bar\"; low_set_pressure = \"3 bar\"; hold_time = "
    "\"5 s\";\n"
    "  size = \"250 mm\"; kv = 900; closure_time = \"20 s\"; } );\n"
    "air_valves = ( { id = \"A1\"; at = \"K3\"; in_parallel = 2; admission_orifice = "
    "\"150 mm\";\n"
    "  release_orifice = \"10 mm\"; switch_pressure = \"5 kPa\"; switched_orifice = "
    "\"5 mm\"; } );\n"
    "states = ( { id = \"all\"; }, { id = \"few\"; running = ( ( \"PS\", 1 ), ( "
    "\"PB\", 0 ) ); } );\n"
    "scenarios = (\n"
    "  { id = \"trip\"; duration = \"60 s\"; class = \"recurring\"; states = [ \"all\" "
    "]; events = (\n"
    "    { pump = \"PS\"; action = \"trip\"; start_time = \"1 s\"; how_many = 2; },\n"
    "    { pump = \"PB\"; action = \"ramp\"; ramp_time = \"9 s\"; to = 0.8; } ); },\n"
    "  { id = \"bare\"; same_as = \"trip\"; without = [ \"VES1\", \"ST\" ]; "
    "for_comparison = true; },\n"
    "  { id = \"rest\"; duration = \"60 s\"; class = \"exceptional\"; events = (\n"
    "    { fixed_level = \"R2\"; level_law = ( ( \"0 s\", \"100 m\" ), ( \"20 s\", "
    "\"99 m\" ) );\n"
    "      period = \"30 s\"; },\n"
    "    { burst = \"K3\"; area = \"0.01 m^2\"; },\n"
    "    { burst = \"K3\"; area = \"0.02 m^2\"; start_time = \"9 s\"; ramp_time = \"1 "
    "s\";\n"
    "      coefficient = 0.8; },\n"
    "    { outflow = \"K3\"; flow_law = ( ( \"0 s\", \"5 L/s\" ), ( \"9 s\", \"1 L/s\" "
    ") ); } ); } );\n"
    "solver = { friction = \"unsteady\"; column_separation = \"vapour-cavity\"; creep "
    "= true; };\n";

/* Writes size bytes to a new file; its name into path. */
static inline void write_bytes(char *path, const char *bytes, size_t size)
{
    (void)snprintf(path, 64, "/tmp/kent-case-XXXXXX");
    const int fd = mkstemp(path);
    assert_true(fd >= 0);
    FILE *file = fdopen(fd, "wb");
    assert_non_null(file);
    assert_int_equal(fwrite(bytes, 1, size, file), size);
    assert_int_equal(fclose(file), 0);
}

static inline kent_catalogue *read_catalogue(void)
{
    kent_complaints complaints = {0};
    kent_error err = {0};
    kent_catalogue *catalogue = NULL;
    const kent_status status =
        kent_catalogue_read(KENT_SOURCE_DIR "/config", &catalogue, &complaints, &err);
    if (complaints.count > 0) print_error("%s\n", complaints.kept[0].what);
    assert_int_equal(status, KENT_OK);
    return catalogue;
}

/* Reads a text as a case; *out may be NULL afterwards. */
static inline kent_status read_bytes(const kent_catalogue *catalogue, const char *bytes,
                                     size_t size, kent_model **out,
                                     kent_complaints *complaints)
{
    char path[64];
    kent_error err = {0};
    *complaints = (kent_complaints){0};
    *out = NULL;
    write_bytes(path, bytes, size);
    const kent_status status =
        kent_case_read(path, catalogue, NULL, out, complaints, &err);
    (void)unlink(path);
    return status;
}

static inline kent_model *read_sound(const kent_catalogue *c, const char *text)
{
    kent_complaints complaints;
    kent_model *m = NULL;
    const kent_status status = read_bytes(c, text, strlen(text), &m, &complaints);
    if (status != KENT_OK) print_error("%s\n", complaints.kept[0].what);
    assert_int_equal(status, KENT_OK);
    assert_non_null(m);
    return m;
}

/* The one complaint of a text, at the line where it belongs. */
static inline void assert_refused_at(const kent_catalogue *c, const char *text,
                                     int line, const char *what)
{
    kent_complaints complaints;
    kent_model *m = NULL;
    assert_int_equal(read_bytes(c, text, strlen(text), &m, &complaints), KENT_E_INPUT);
    assert_null(m);
    assert_string_equal(complaints.kept[0].what, what);
    assert_int_equal(complaints.count, 1);
    assert_int_equal(complaints.kept[0].line, line);
}

/* The value noted as assumed for something, NULL where it was not. */
static inline const char *assumed(const kent_model *m, const char *what)
{
    for (size_t i = 0; i < m->assumed.count; i++) {
        const char *note = m->assumed.text[i];
        const size_t n = strlen(what);
        if (strncmp(note, what, n) == 0 && note[n] == '\t') return note + n + 1;
    }
    return NULL;
}

static inline size_t cautions_with(const kent_model *m, const char *words)
{
    size_t count = 0;
    for (size_t i = 0; i < m->cautions.count; i++) {
        count += strstr(m->cautions.text[i], words) != NULL;
    }
    return count;
}

/* The text with the first `from` replaced by `to`; the caller frees. */
static inline char *replaced(const char *text, const char *from, const char *to)
{
    const char *at = strstr(text, from);
    assert_non_null(at);
    const size_t before = (size_t)(at - text);
    char *out = kent_alloc(strlen(text) + strlen(to) + 1, 1);
    assert_non_null(out);
    memcpy(out, text, before);
    (void)snprintf(out + before, strlen(text) - before + strlen(to) + 1, "%s%s", to,
                   at + strlen(from));
    return out;
}

#endif
