/* Standard tables: a cell is what a case with one such fitting gives, and tables that
 * were published come out again. */
#include "case_text.h"
#include "kent_standard_job.h"

#include <math.h>

#define LBF 4.4482216152605 /* N */
#define FT2 (0.3048 * 0.3048)
#define FT  0.3048

typedef struct worked {
    kent_catalogue *catalogue;
    kent_standard *table;
    kent_standard_result *result;
} worked;

static worked work_out(const char *text)
{
    worked w = {.catalogue = read_catalogue()};
    char path[64];
    kent_complaints complaints = {0};
    kent_error err = {0};
    write_bytes(path, text, strlen(text));
    const kent_status status =
        kent_standard_read(path, w.catalogue, NULL, &w.table, &complaints, &err);
    (void)unlink(path);
    if (complaints.count > 0) print_error("%s\n", complaints.kept[0].what);
    assert_int_equal(status, KENT_OK);
    assert_int_equal(kent_standard_work_out(w.table, 1, &w.result, &err), KENT_OK);
    return w;
}

static void let_go(worked *w)
{
    kent_standard_result_free(w->result);
    kent_standard_free(w->table);
    kent_catalogue_free(w->catalogue);
}

static size_t index_of(char (*names)[KENT_ID], size_t count, const char *name)
{
    size_t i = 0;
    while (i < count && strcmp(names[i], name) != 0) {
        i++;
    }
    if (i == count) fail_msg("the table has no %s", name);
    return i;
}

static const kent_standard_cell_result *cell(const worked *w, const char *soil,
                                             const char *size, const char *fitting)
{
    const kent_standard *t = w->table;
    const size_t at =
        kent_standard_cell_index(t, index_of(t->soils, t->soil_count, soil),
                                 index_of(t->sizes, t->size_count, size),
                                 index_of(t->fittings, t->fitting_count, fitting));
    return &w->result->cells[at];
}

/* ---- a cell is a case ------------------------------------------------------------ */

#define BANK                                                                           \
    "{ id = \"bank\"; allowable_bearing = \"90 kPa\"; factor_inside = 1.2;\n"          \
    "  vertical_bearing = \"110 kPa\"; unit_weight = \"19 kN/m^3\";\n"                 \
    "  friction_angle = \"31 deg\"; cohesion = \"2 kPa\"; friction_ratio = 0.7;\n"     \
    "  adhesion_ratio = 0.4; passive_ratios = ( ( \"type-3\", 0.5 ) ); }"

static const char TABLE[] =
    "format = 1;\nunits = \"SI\";\npressure = \"12.5 bar\";\n"
    "sizes = ( \"DI-EN545-C40-DN150\", \"DI-EN545-C40-DN300\" );\n"
    "fittings = ( \"dead-end\", \"tee\", \"valve\", \"bend 45 deg\", \"crest 30 "
    "deg\",\n"
    "  \"sag 22.5 deg\", \"wye 60 deg\" );\n"
    "soils = ( " BANK " );\ncover = \"1.3 m\"; water_table = \"1.1 m\";\n"
    "trench = \"type-3\"; wrapped = true; safety_factor = 1.6;\n"
    "design_rules = { set = \"common-practice\"; side_step = \"0.02 m\"; };\n";

/* The same by an engineer who has a main with this fitting: other lengths, joints of
 * the same kind, a test at this pressure and no tank that comes near it. */
static const char MAIN[] =
    "format = 1;\n"
    "points = ( { id = \"R\"; z = \"5 m\"; }, { id = \"F\"; z = \"5 m\"; }%s );\n"
    "pipes = ( { id = \"A\"; route = [ \"R\", \"F\" ]; length = \"900 m\";\n"
    "  pipe_class = \"%s\"; joint = \"push-on\"; }%s );\n"
    "fixed_levels = ( { at = \"R\"; level = \"6 m\"; }%s );\n%s"
    "soils = ( " BANK " );\n"
    "ground = { soil = \"bank\"; cover = \"1.3 m\"; water_table = \"1.1 m\";\n"
    "  trench = \"type-3\"; wrapped = true; };\n"
    "fittings = ( { at = \"F\";%s } );\n"
    "loads = { test_pressure = \"12.5 bar\"; test_gauge_at = \"F\"; safety_factor = "
    "1.6; "
    "};\n"
    "design_rules = { set = \"common-practice\"; side_step = \"0.02 m\"; };\n";

static const struct {
    const char *fitting, *note;
    bool onward, branch, valve;
} MAINS[] = {
    {"dead-end", "", false, false, false},
    {"tee", "", true, true, false},
    {"valve", "", true, false, true},
    {"bend 45 deg", " angle = \"45 deg\";", true, false, false},
    {"crest 30 deg", " angle = \"30 deg\"; orientation = \"crest\";", true, false,
     false},
    {"sag 22.5 deg", " angle = \"22.5 deg\"; orientation = \"sag\";", true, false,
     false},
    {"wye 60 deg", " angle = \"60 deg\";", true, true, false},
};

static char *main_text(size_t which, const char *class)
{
    char pipes[600] = "", *text = malloc(4000);
    size_t used = 0;
    assert_non_null(text);
    if (MAINS[which].onward) {
        used +=
            (size_t)snprintf(pipes, sizeof pipes,
                             ", { id = \"B\"; route = [ \"F\", \"E\" ]; length = "
                             "\"800 m\"; pipe_class = \"%s\"; joint = \"push-on\"; }",
                             class);
    }
    if (MAINS[which].branch) {
        (void)snprintf(pipes + used, sizeof pipes - used,
                       ", { id = \"C\"; route = [ \"F\", \"D\" ]; length = \"700 m\"; "
                       "pipe_class = \"%s\"; joint = \"push-on\"; }",
                       class);
    }
    (void)snprintf(
        text, 4000, MAIN,
        MAINS[which].branch   ? ", { id = \"E\"; z = \"5 m\"; }, { id = \"D\"; z "
                                "= \"5 m\"; }"
        : MAINS[which].onward ? ", { id = \"E\"; z = \"5 m\"; }"
                              : "",
        class, pipes, MAINS[which].onward ? ", { at = \"E\"; level = \"6 m\"; }" : "",
        MAINS[which].valve ? "valves = ( { id = \"V\"; at = \"F\"; type = "
                             "\"gate\"; size = \"100 mm\"; } );\n"
                           : "",
        MAINS[which].note);
    return text;
}

static void assert_same(double a, double b, const char *what, const char *where)
{
    const bool same = (isnan(a) && isnan(b)) || fabs(a - b) <= 1e-12 * fabs(b);
    if (same) return;
    fail_msg("%s of %s: %.17g in the table, %.17g in the case", what, where, a, b);
}

static void assert_same_holding(const kent_standard_cell_result *c,
                                const kent_holding *h, const char *where)
{
    const kent_block *a = &c->holding.block, *b = &h->block;
    assert_int_equal(a->type, b->type);
    assert_same(c->holding.design_thrust, h->design_thrust, "design thrust", where);
    assert_same(a->bearing_area, b->bearing_area, "area", where);
    assert_same(a->width, b->width, "width", where);
    assert_same(a->height, b->height, "height", where);
    assert_same(a->thickness, b->thickness, "thickness", where);
    assert_same(a->volume, b->volume, "volume", where);
    assert_same(a->face.width, b->face.width, "face", where);
    assert_same(a->face.height, b->face.height, "face", where);
    assert_same(a->face_volume, b->face_volume, "face", where);
    assert_same(c->holding.utilisation, h->utilisation, "use", where);
    assert_same(c->holding.restrained_length, h->restrained_length, "length", where);
    assert_int_equal(c->holding.leg_count, h->leg_count);
}

static void a_cell_is_what_a_case_with_one_such_fitting_gives(void **state)
{
    (void)state;
    worked w = work_out(TABLE);
    size_t blocks = 0, lengths = 0;
    for (size_t k = 0; k < w.table->size_count; k++) {
        for (size_t i = 0; i < sizeof MAINS / sizeof MAINS[0]; i++) {
            const kent_job_options options = {.threads = 1};
            kent_error err = {0};
            kent_results *r = NULL;
            char *text = main_text(i, w.table->sizes[k]);
            kent_model *m = read_sound(w.catalogue, text);
            assert_int_equal(kent_job_run(m, &options, &r, &err), KENT_OK);
            const int f = kent_model_fitting_of(m, "F");
            assert_true(f >= 0);
            const kent_holding *h = &r->restraints->fittings[f];
            assert_same_holding(cell(&w, "bank", w.table->sizes[k], MAINS[i].fitting),
                                h, MAINS[i].fitting);
            blocks += h->block.type != KENT_BLOCK_NONE;
            lengths += h->leg_count > 0;
            kent_results_free(r);
            kent_model_free(m);
            free(text);
        }
    }
    assert_true(blocks >= 10); /* nothing compared is a failure */
    assert_true(lengths == 14);
    let_go(&w);
}

/* A fitting on a sheet: its ports in place of pipes. */
static void a_cell_has_the_block_of_a_fitting_stated_by_its_ports(void **state)
{
    (void)state;
    static const char SHEET[] =
        "format = 1;\n"
        "fittings = ( { id = \"B\"; type = \"bend\"; ports = (\n"
        "  { direction = [ -1.0, 0.0, 0.0 ]; pressure = \"12.5 bar\"; inside_diameter "
        "= "
        "\"150 mm\"; outside_diameter = \"170 mm\"; },\n"
        "  { direction = [ 1.0, 1.0, 0.0 ]; pressure = \"12.5 bar\"; inside_diameter = "
        "\"150 mm\"; outside_diameter = \"170 mm\"; } ); } );\n"
        "soils = ( " BANK " );\n"
        "ground = { soil = \"bank\"; cover = \"1.3 m\"; water_table = \"1.1 m\"; };\n"
        "loads = { safety_factor = 1.6; };\n"
        "design_rules = { set = \"common-practice\"; side_step = \"0.02 m\"; };\n";
    worked w = work_out(TABLE);
    const kent_job_options options = {.threads = 1};
    kent_error err = {0};
    kent_results *r = NULL;
    kent_model *m = read_sound(w.catalogue, SHEET);
    assert_int_equal(kent_job_run(m, &options, &r, &err), KENT_OK);
    const kent_standard_cell_result *c =
        cell(&w, "bank", "DI-EN545-C40-DN150", "bend 45 deg");
    const kent_block *a = &c->holding.block, *b = &r->restraints->fittings[0].block;
    assert_close(c->holding.design_thrust, r->restraints->fittings[0].design_thrust,
                 1e-12);
    assert_close(a->bearing_area, b->bearing_area, 1e-12);
    assert_close(a->width * a->height * a->thickness,
                 b->width * b->height * b->thickness, 1e-12);
    kent_results_free(r);
    kent_model_free(m);
    let_go(&w);
}

static void what_is_asked_for_is_what_is_told_to_be_missing(void **state)
{
    (void)state;
    static const struct {
        const char *restraint;
        size_t not_sized; /* of 3 cells: sound, without friction, peat */
    } ROWS[] = {{"thrust-block", 1}, {"restrained-joints", 2}, {"both", 2}};
    static const char TEXT[] =
        "format = 1;\npressure = \"10 bar\";\nsizes = ( \"DI-EN545-C40-DN150\" );\n"
        "fittings = ( \"tee\" );\n"
        "soils = ( " BANK ", { id = \"plain\"; allowable_bearing = \"90 kPa\"; },\n"
        "  \"peat-PT\" );\ncover = \"1.3 m\"; trench = \"type-3\"; restraint = "
        "\"%s\";\n";
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char text[2000];
        (void)snprintf(text, sizeof text, TEXT, ROWS[i].restraint);
        worked w = work_out(text);
        const bool blocks = i != 1;
        const kent_standard_cell_result *sound =
            cell(&w, "bank", "DI-EN545-C40-DN150", "tee");
        assert_int_equal(w.result->not_sized, ROWS[i].not_sized);
        assert_int_equal(sound->holding.chosen,
                         blocks ? KENT_THRUST_BLOCK : KENT_RESTRAINED_JOINTS);
        assert_int_equal(sound->holding.block.type,
                         blocks ? KENT_BLOCK_BEARING : KENT_BLOCK_NONE);
        let_go(&w);
    }
}

static void a_pressure_above_the_rating_of_a_size_is_noticed(void **state)
{
    (void)state;
    static const char TEXT[] =
        "format = 1;\npressure = \"45 bar\";\n"
        "sizes = ( \"DI-EN545-C40-DN150\", { name = \"d\"; outside_diameter = \"170 "
        "mm\"; "
        "} );\nfittings = ( \"tee\" );\nsoils = ( " BANK " );\ncover = \"1.3 m\";\n";
    worked w = work_out(TEXT);
    assert_true(cell(&w, "bank", "DI-EN545-C40-DN150", "tee")->over_rating);
    assert_false(cell(&w, "bank", "d", "tee")->over_rating);
    let_go(&w);
}

/* ---- published tables ------------------------------------------------------------ */

/* Moser, Buried Pipe Design, example 4.3: 10 in iron pipe, right-angled bend, 200 psi,
 * 2000 psf, no factor: 27 360 lbf, 13.68 ft2. Sheet of the city of Chula Vista: 4 and
 * 6 in, 200 psi, 1500 psf, factor 1.5: thrusts before it, and areas that hold none of
 * it (the areas are thrust x 1.5 / 1500 psf). */
static void published_bearing_areas_come_out(void **state)
{
    (void)state;
    static const char TEXT[] =
        "format = 1;\nunits = \"US\";\npressure = \"200 psi\";\n"
        "sizes = ( { name = \"4\"; outside_diameter = \"4.80 in\"; },\n"
        "  { name = \"6\"; outside_diameter = \"6.90 in\"; },\n"
        "  { name = \"10\"; outside_diameter = \"11.10 in\"; } );\n"
        "fittings = ( \"dead-end\", \"bend 90 deg\", \"bend 45 deg\", \"bend 22.5 "
        "deg\",\n"
        "  \"bend 11.25 deg\" );\n"
        "soils = ( { id = \"moser\"; allowable_bearing = \"2000 psf\"; },\n"
        "  { id = \"vista\"; allowable_bearing = \"1500 psf\"; } );\n"
        "cover = \"5 ft\"; safety_factor = %s; restraint = \"thrust-block\";\n";
    static const struct {
        const char *factor, *soil, *size, *fitting;
        double thrust, area; /* lbf, ft2 */
        double rel;
    } ROWS[] = {
        {"1.0", "moser", "10", "bend 90 deg", 27360.0, 13.68, 5e-4},
        {"1.5", "vista", "4", "dead-end", 3620.0, 3.62, 3e-3},
        {"1.5", "vista", "4", "bend 90 deg", 5118.0, 5.12, 3e-3},
        {"1.5", "vista", "4", "bend 45 deg", 2770.0, 2.77, 3e-3},
        {"1.5", "vista", "4", "bend 22.5 deg", 1412.0, 1.41, 3e-3},
        {"1.5", "vista", "4", "bend 11.25 deg", 710.0, 0.71, 3e-3},
        {"1.5", "vista", "6", "dead-end", 7478.0, 7.48, 1e-3},
        {"1.5", "vista", "6", "bend 90 deg", 10576.0, 10.58, 1e-3},
        {"1.5", "vista", "6", "bend 45 deg", 5724.0, 5.72, 1e-3},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        char text[2000];
        (void)snprintf(text, sizeof text, TEXT, ROWS[i].factor);
        worked w = work_out(text);
        const kent_standard_cell_result *c =
            cell(&w, ROWS[i].soil, ROWS[i].size, ROWS[i].fitting);
        assert_close(c->thrust, ROWS[i].thrust * LBF, ROWS[i].rel);
        assert_close(c->holding.block.bearing_area, ROWS[i].area * FT2, ROWS[i].rel);
        let_go(&w);
    }
}

/* City of Renton drawing S-3415: thrusts on the nominal bore, of pipe that is larger
 * outside (AWWA C151: 25.80, 17.40 and 11.10 in). */
static void thrusts_on_the_nominal_bore_come_out_where_sizes_are_nominal(void **state)
{
    (void)state;
    static const struct {
        const char *pressure, *size, *outside;
        double end, square, eighth, sixteenth; /* lbf; NAN: not printed */
    } ROWS[] = {{"200 psi", "24 in", "25.80 in", 90480.0, 127980.0, 69200.0, NAN},
                {"225 psi", "16 in", "17.40 in", 45250.0, 64000.0, 34620.0, 17650.0},
                {"275 psi", "10 in", "11.10 in", 21620.0, 30570.0, 16540.0, NAN}};
    static const char *const FITTINGS[] = {"dead-end", "bend 90 deg", "bend 45 deg",
                                           "bend 22.5 deg"};
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const double wanted[] = {ROWS[i].end, ROWS[i].square, ROWS[i].eighth,
                                 ROWS[i].sixteenth};
        char text[1000];
        (void)snprintf(text, sizeof text,
                       "format = 1;\nunits = \"US\";\npressure = \"%s\";\n"
                       "thrust_area = \"nominal\";\nsizes = ( { name = \"n\"; "
                       "outside_diameter = \"%s\"; nominal_size = \"%s\"; } );\n"
                       "fittings = ( \"dead-end\", \"bend 90 deg\", \"bend 45 deg\", "
                       "\"bend 22.5 deg\" );\nsoils = ( \"sand-SP\" );\n"
                       "cover = \"4 ft\";\n",
                       ROWS[i].pressure, ROWS[i].outside, ROWS[i].size);
        worked w = work_out(text);
        for (size_t k = 0; k < 4; k++) {
            if (isnan(wanted[k])) continue;
            assert_close(cell(&w, "sand-SP", "n", FITTINGS[k])->thrust, wanted[k] * LBF,
                         1e-3);
        }
        let_go(&w);
    }
}

/* The same blocks' concrete is checked by what the table says of it. */
static void a_table_may_name_its_concrete(void **state)
{
    (void)state;
    static const char *const SAYS[] = {"", "concrete = { class = \"C30/37\"; };\n",
                                       "concrete = { strength = \"12 MPa\"; };\n"};
    static const double STRENGTH[] = {16e6, 30e6, 12e6}; /* Pa; the low class C16/20 */
    for (size_t i = 0; i < 3; i++) {
        char text[2000];
        (void)snprintf(text, sizeof text, "%s%s", TABLE, SAYS[i]);
        worked w = work_out(text);
        const kent_standard_cell_result *c =
            cell(&w, "bank", "DI-EN545-C40-DN300", "bend 45 deg");
        assert_close(c->holding.concrete.strength, STRENGTH[i], 1e-12);
        assert_int_equal(c->holding.concrete.strength_assumed, i == 0);
        let_go(&w);
    }
}

/* Vertical bends with one leg level, handbook form from memory: Ty = P A sin th, Tx = P
 * A (1 - cos th); 12 in, 45 degrees, 150 psi: 14 515 and 6012 lbf. */
static void a_crest_pushes_up_and_along_as_handbooks_have_it(void **state)
{
    (void)state;
    static const char TEXT[] =
        "format = 1;\nunits = \"US\";\npressure = \"150 psi\";\n"
        "sizes = ( { name = \"12\"; outside_diameter = \"13.20 in\"; } );\n"
        "fittings = ( \"crest 45 deg\", \"sag 45 deg\" );\n"
        "soils = ( { id = \"firm\"; allowable_bearing = \"1000 psf\"; } );\n"
        "cover = \"4 ft\"; safety_factor = 1.5; restraint = \"thrust-block\";\n";
    worked w = work_out(TEXT);
    const kent_standard_cell_result *crest = cell(&w, "firm", "12", "crest 45 deg");
    const kent_standard_cell_result *sag = cell(&w, "firm", "12", "sag 45 deg");
    assert_close(crest->thrust, hypot(14515.0, 6012.0) * LBF, 1e-3);
    assert_close(crest->holding.block.bearing_area, 1.5 * 6012.0 / 1000.0 * FT2, 1e-3);
    assert_int_equal(crest->holding.block.type, KENT_BLOCK_GRAVITY);
    assert_int_equal(sag->holding.block.type, KENT_BLOCK_BASE);
    assert_close(sag->holding.block.bearing_area, 1.5 * 14515.0 / 1000.0 * FT2, 1e-3);
    let_go(&w);
}

/* Restrained lengths by the iron-pipe handbooks' form (memory), all inputs stated,
 * worked out by themselves to the foot's hundredth: 12 and 24 in iron pipe, unlined. */
static void restrained_lengths_of_the_handbooks_form_come_out(void **state)
{
    (void)state;
    static const char TEXT[] =
        "format = 1;\nunits = \"US\";\npressure = \"150 psi\";\n"
        "sizes = ( { name = \"12\"; outside_diameter = \"13.20 in\"; wall_thickness = "
        "\"0.28 in\"; material = \"ductile-iron\"; } );\n"
        "fittings = ( \"dead-end\", \"bend 90 deg\", \"bend 45 deg\" );\n"
        "soils = (\n"
        "  { id = \"s1\"; allowable_bearing = \"2000 psf\"; unit_weight = \"90 pcf\";\n"
        "    friction_angle = \"30 deg\"; cohesion = \"0 psf\"; friction_ratio = "
        "0.75;\n"
        "    passive_ratio = 1.0; },\n"
        "  { id = \"s85\"; allowable_bearing = \"2000 psf\"; unit_weight = \"90 "
        "pcf\";\n"
        "    friction_angle = \"30 deg\"; cohesion = \"0 psf\"; friction_ratio = "
        "0.75;\n"
        "    passive_ratio = 0.85; },\n"
        "  { id = \"clay\"; allowable_bearing = \"2000 psf\"; unit_weight = \"90 "
        "pcf\";\n"
        "    friction_angle = \"0 deg\"; cohesion = \"450 psf\"; adhesion_ratio = "
        "0.8;\n"
        "    passive_ratio = 0.4; } );\n"
        "cover = \"4 ft\"; safety_factor = 1.5; restraint = \"restrained-joints\";\n";
    static const struct {
        const char *soil, *fitting;
        double feet;
    } ROWS[] = {{"s1", "bend 90 deg", 29.59},   {"s1", "dead-end", 84.37},
                {"s85", "bend 45 deg", 13.58},  {"s85", "dead-end", 84.37},
                {"clay", "bend 90 deg", 33.83}, {"clay", "dead-end", 24.75}};
    worked w = work_out(TEXT);
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        assert_close(
            cell(&w, ROWS[i].soil, "12", ROWS[i].fitting)->holding.restrained_length,
            ROWS[i].feet * FT, 2e-3);
    }
    let_go(&w);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_cell_is_what_a_case_with_one_such_fitting_gives),
        cmocka_unit_test(a_cell_has_the_block_of_a_fitting_stated_by_its_ports),
        cmocka_unit_test(what_is_asked_for_is_what_is_told_to_be_missing),
        cmocka_unit_test(a_pressure_above_the_rating_of_a_size_is_noticed),
        cmocka_unit_test(published_bearing_areas_come_out),
        cmocka_unit_test(thrusts_on_the_nominal_bore_come_out_where_sizes_are_nominal),
        cmocka_unit_test(a_table_may_name_its_concrete),
        cmocka_unit_test(a_crest_pushes_up_and_along_as_handbooks_have_it),
        cmocka_unit_test(restrained_lengths_of_the_handbooks_form_come_out),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
