/* Points and pipes from tables: the same main as from lists, whatever way a spreadsheet
 * writes them, and each fault said with its file and line. */
#include "table_folder.h"

#include <math.h>

static kent_model *read_tables(const kent_catalogue *c, const char *text,
                               const char *points, const char *pipes)
{
    kent_complaints complaints;
    kent_model *m = NULL;
    const kent_status status = read_folder(c, text, points, 0, pipes, &m, &complaints);
    if (status != KENT_OK) print_error("%s\n", complaints.kept[0].what);
    assert_int_equal(status, KENT_OK);
    assert_non_null(m);
    return m;
}

static void a_main_from_tables_is_the_main_from_lists(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_complaints complaints;
    kent_model *lists = NULL;
    assert_int_equal(read_bytes(c, SOUND_CASE, strlen(SOUND_CASE), &lists, &complaints),
                     KENT_OK);
    kent_model *m = read_tables(c, TABLE_CASE, POINTS_TABLE, PIPES_TABLE);
    assert_int_equal(m->point_count, lists->point_count);
    assert_int_equal(m->pipe_count, lists->pipe_count);
    for (size_t i = 0; i < m->point_count; i++) {
        assert_string_equal(m->points[i].id, lists->points[i].id);
        assert_close(
            kent_vec3_length(kent_vec3_sub(m->points[i].at, lists->points[i].at)), 0.0,
            0.0);
    }
    assert_int_equal(m->route_count, lists->route_count);
    assert_int_equal(m->node_count, lists->node_count);
    assert_close(m->pipes[0].inside_diameter, lists->pipes[0].inside_diameter, 0.0);
    assert_int_equal(m->fitting_count, lists->fitting_count);
    assert_int_equal(m->file_count, 3);
    assert_non_null(strstr(m->files[1], "/points.csv"));
    assert_non_null(strstr(m->files[2], "/pipes.csv"));
    assert_int_equal(m->points[1].place.file, 1);
    assert_int_equal(m->points[1].place.line, 3);
    assert_int_equal(m->pipes[0].place.file, 2);
    assert_int_equal(m->pipes[0].place.line, 2);
    kent_model_free(m);
    kent_model_free(lists);
    kent_catalogue_free(c);
}

static unsigned long long fnv_1a(unsigned long long sum, const char *text)
{
    for (const char *p = text; *p; p++) {
        sum = (sum ^ (unsigned char)*p) * 1099511628211ULL;
    }
    return sum;
}

static void the_checksum_takes_in_the_tables(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_tables(c, TABLE_CASE, POINTS_TABLE, PIPES_TABLE);
    const unsigned long long want = fnv_1a(
        fnv_1a(fnv_1a(14695981039346656037ULL, TABLE_CASE), POINTS_TABLE), PIPES_TABLE);
    assert_true(m->checksum == want);
    kent_model_free(m);
    kent_catalogue_free(c);
}

/* What is listed in the case comes first; each in its file's order. */
static void lists_and_tables_add_up(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *text = replaced(TABLE_CASE, "fixed_levels",
                          "points = ( { id = \"L1\"; x = \"9 m\"; y = \"9 m\"; z = \"1 "
                          "m\"; } );\nfixed_levels");
    kent_model *m = read_tables(c, text, POINTS_TABLE, PIPES_TABLE);
    assert_int_equal(m->point_count, 4);
    assert_string_equal(m->points[0].id, "L1");
    assert_string_equal(m->points[1].id, "R1");
    assert_string_equal(m->points[3].id, "E1");
    assert_int_equal(m->route[0], 1);
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

/* The same three points as people and their spreadsheets write them. */
static void every_way_of_writing_gives_the_same_points(void **state)
{
    (void)state;
    static const struct {
        char separator; /* of both tables, where it is not the comma */
        const char *tables, *points;
    } WAYS[] = {
        {0, "",
         "id,x [m],y [m],z [m]\r\nR1,0,0,50\r\nB1,400,0,30\r\nE1,700,300,20\r\n"},
        {0, "",
         "\xEF\xBB\xBFid,x [m],y [m],z [m]\nR1,0,0,50\nB1,400,0,30\nE1,700,300,20"},
        {0, "",
         "\"id\",\"x [m]\",\"y [m]\",\"z [m]\"\n\"R1\",\"0\",\"0\",\"50\"\n"
         "\"B1\",\"400\",\"0\",\"30\"\n\"E1\",\"700\",\"300\",\"20\"\n"},
        {0, "",
         "z [cm], y [m] ,x [km],id\n5000,0,0,R1\n3000 , 0 , 0.4 , B1\n"
         "2e3,300,.7,E1\n\n,,,\n"},
        {0, "", /* columns that a spreadsheet keeps although they are empty */
         "id,x [m],y [m],z [m],,\nR1,0,0,50,,\nB1,400,0,30,,,,\nE1,700,300,20\n"},
        {0, "", /* units in a row of their own */
         "id,x,y,z\n,km,m,[cm]\nR1,0,0,5000\nB1,0.4,0,30 m\nE1,0.7,300,2000\n"},
        {0, "",
         "id,x,y [m],z [m]\nR1,0 m,0,50\nB1,0.4 km,0 m,30\nE1,700 m,300,2000 cm\n"},
        {';', "tables = { decimal = \"comma\"; separator = \"semicolon\"; };",
         "id;x [km];y [m];z [m]\nR1;0;0,0;50,00\nB1;0,4;0;30\nE1;0,7;300;20\n"},
        {'\t', "tables = { separator = \"tab\"; };",
         "id\tx [m]\ty [m]\tz [m]\tcover [m]\nR1\t0\t0\t50\t\nB1\t400\t0\t30\t\n"
         "E1\t700\t300\t20\t\n"},
        {';', "tables = { separator = \"semicolon\"; };",
         "id;x [m];y [m];z [m];record\nR1;0;0;50;FALSE\nB1;400;0;30;false\n"
         "E1;700;300;20;\n"},
    };
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_tables(c, TABLE_CASE, POINTS_TABLE, PIPES_TABLE);
    for (size_t i = 0; i < sizeof WAYS / sizeof WAYS[0]; i++) {
        char text[2048];
        char pipes[256];
        (void)snprintf(text, sizeof text, "%s%s\n", TABLE_CASE, WAYS[i].tables);
        (void)snprintf(pipes, sizeof pipes, "%s", PIPES_TABLE);
        for (char *p = pipes; *p && WAYS[i].separator != '\0'; p++) {
            if (*p == ',') *p = WAYS[i].separator;
        }
        kent_model *other = read_tables(c, text, WAYS[i].points, pipes);
        assert_int_equal(other->point_count, 3);
        for (size_t p = 0; p < 3; p++) {
            assert_string_equal(other->points[p].id, m->points[p].id);
            assert_within(other->points[p].at.x, m->points[p].at.x, 1e-12);
            assert_within(other->points[p].at.y, m->points[p].at.y, 1e-12);
            assert_within(other->points[p].at.z, m->points[p].at.z, 1e-12);
            assert_true(isnan(other->points[p].cover));
        }
        kent_model_free(other);
    }
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void every_type_of_value_stands_in_a_cell(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_tables(
        c, TABLE_CASE,
        "id,x [m],y [m],z [m],cover [ft],water_table [m],soil,record\n"
        "R1,0,0,50,4,none,silt-ML,true\nB1,400,0,30,5 "
        "ft,2.5,,\nE1,700,300,20,,,,\n",
        "id,route,outside_diameter [in],wall_thickness [mm],material,roughness [mm],"
        "poisson_ratio,joint_deflection [deg],axial_support\n"
        "A,R1  B1 E1,12,6.5,steel,0.1,0.3,2,fixed-upstream\n");
    assert_close(m->points[0].cover, 4.0 * 0.3048, 1e-12);
    assert_close(m->points[1].cover, 5.0 * 0.3048, 1e-12);
    assert_true(isinf(m->points[0].water_table));
    assert_close(m->points[1].water_table, 2.5, 1e-12);
    assert_true(m->points[0].record);
    assert_false(m->points[1].record);
    assert_string_equal(m->soils[m->points[0].soil].id, "silt-ML");
    assert_int_equal(m->pipes[0].route_count, 3);
    assert_close(m->pipes[0].outside_diameter, 12.0 * 0.0254, 1e-12);
    assert_close(m->pipes[0].wall, 0.0065, 1e-12);
    assert_close(m->pipes[0].friction_coefficient, 1e-4, 1e-12);
    assert_close(m->pipes[0].poisson, 0.3, 1e-12);
    assert_close(m->pipes[0].joint_deflection, 2.0 * acos(-1.0) / 180.0, 1e-12);
    assert_int_equal(m->pipes[0].axial_support, KENT_FIXED_UPSTREAM);
    kent_model_free(m);
    kent_catalogue_free(c);
}

/* ---- faults ---------------------------------------------------------------------- */

typedef struct fault {
    const char *tables;         /* added to the case */
    const char *points, *pipes; /* NULL: the sound ones */
    const char *file;           /* end of the file that is named */
    int line;
    const char *part; /* of the message */
} fault;

static void is_refused(const kent_catalogue *c, const fault *f)
{
    char text[2048];
    kent_model *m = NULL;
    kent_complaints complaints;
    (void)snprintf(text, sizeof text, "%s%s\n", TABLE_CASE, f->tables ? f->tables : "");
    const kent_status status =
        read_folder(c, text, f->points ? f->points : POINTS_TABLE, 0,
                    f->pipes ? f->pipes : PIPES_TABLE, &m, &complaints);
    assert_int_equal(status, KENT_E_INPUT);
    assert_null(m);
    const kent_complaint *first = &complaints.kept[0];
    if (!strstr(first->what, f->part) || first->line != f->line) {
        print_error("%d: %s\nwanted %d: %s\n", first->line, first->what, f->line,
                    f->part);
    }
    assert_non_null(strstr(first->what, f->part));
    assert_int_equal(first->line, f->line);
    assert_string_equal(first->file + strlen(first->file) - strlen(f->file), f->file);
}

#define ROWS "R1,0,0,50\nB1,400,0,30\nE1,700,300,20\n"

static void faults_of_headings_say_what_would_be_right(void **state)
{
    (void)state;
    static const fault FAULTS[] = {
        {NULL, "id,x [m],y [m],zz [m]\n" ROWS, NULL, "points.csv", 1,
         "heading 'zz' is not a key of a point; did you mean 'z'?"},
        {NULL, "id,x [m],y [m],chainage [m]\n" ROWS, NULL, "points.csv", 1,
         "heading 'chainage' is not a key of a point"},
        {NULL, "id,x [m],x [m],z [m]\n" ROWS, NULL, "points.csv", 1,
         "'x' heads two columns, 2 and 3; keep one"},
        {NULL, "id,x [m],y [bar],z [m]\n" ROWS, NULL, "points.csv", 1,
         "heading 'y [bar]': '1 bar' is a pressure where a length belongs"},
        {NULL, "id,x [m],y [m],z [mtr]\n" ROWS, NULL, "points.csv", 1,
         "heading 'z [mtr]': 'mtr' in '1 mtr' is not a unit; write for instance 'z "
         "[m]'"},
        {NULL, "id [m],x [m],y [m],z [m]\n" ROWS, NULL, "points.csv", 1,
         "heading 'id [m]': id takes no unit; write 'id'"},
        {NULL, "id,x (m),y [m],z [m]\n" ROWS, NULL, "points.csv", 1,
         "heading 'x (m)' cannot be read; a unit stands in square brackets after its "
         "key, as 'z [m]'"},
        {NULL, "id,x [m],Y [m],z [m]\n" ROWS, NULL, "points.csv", 1,
         "heading 'Y' is not a key of a point; did you mean 'y'?"},
        {NULL, "id,x [m],y [m],h [m]\n" ROWS, NULL, "points.csv", 1,
         "heading 'h' is not a key of a point; 'kentledge check --keys'"},
        {NULL, "id,x [m],y [m],z [m;1]\n" ROWS, NULL, "points.csv", 1,
         "heading 'z [m;1]': 'm;1' in '1 m;1' is not a unit; write for instance"},
        {NULL, "id,x [m,y [m],z [m]\n" ROWS, NULL, "points.csv", 1,
         "heading 'x [m' cannot be read"},
        {NULL, "id,x,y,z\n,m,bar,m\n" ROWS, NULL, "points.csv", 2,
         "heading 'y [bar]': '1 bar' is a pressure where a length belongs"},
        {NULL, "id,x,y,z,soil\n,m,m,m,sand\n" ROWS, NULL, "points.csv", 3,
         "the row has 4 cells"},
        {NULL, "id,x,y,z\n,m,m,m\n", NULL, "points.csv", 1,
         "the table has headings and no rows"},
        {NULL, "id,x [m],,z [m]\n" ROWS, NULL, "points.csv", 1,
         "column 3 has no heading; name it or take the column out"},
        {NULL, "id,x [m],y [m]\nR1,0,0\n", NULL, "points.csv", 1,
         "column 'z' is missing (level of the pipe's centre line); give it the heading "
         "'z [m]'"},
        {NULL, NULL, "id,pipe_class\nA,DI-EN545-C40-DN300\n", "pipes.csv", 1,
         "column 'route' is missing"},
        {NULL, NULL, "id,route,creep\nA,R1 B1,\n", "pipes.csv", 1,
         "'creep' is a list and cannot stand in a table; what has one is written in "
         "the "
         "case file"},
        {NULL, "id;x [m];y [m];z [m]\nR1;0;0;50\n", NULL, "points.csv", 1,
         "separated by a semicolon; say so in the case file: tables = { separator = "
         "\"semicolon\"; }"},
        {NULL, "id\tx [m]\tz [m]\nR1\t0\t50\n", NULL, "points.csv", 1,
         "tables = { separator = \"tab\"; }"},
        {"tables = { separator = \"tab\"; };", NULL, NULL, "points.csv", 1,
         "tables = { separator = \"comma\"; }"},
        {NULL, "# survey of May\nid,x [m],y [m],z [m]\n" ROWS, NULL, "points.csv", 1,
         "heading '# survey of May' is not a key of a point"},
        {NULL, "\n\n", NULL, "points.csv", 1,
         "the table is empty; its first row holds the headings"},
        {NULL, "\nid,x [m],y [m],z [m]\n", NULL, "points.csv", 2,
         "the table has headings and no rows"},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof FAULTS / sizeof FAULTS[0]; i++) {
        is_refused(c, &FAULTS[i]);
    }
    kent_catalogue_free(c);
}

#define COMMA "tables = { decimal = \"comma\"; separator = \"semicolon\"; };"
#define HEAD  "id,x [m],y [m],z [m]\n"

static void faults_of_cells_say_what_would_be_right(void **state)
{
    (void)state;
    static const fault FAULTS[] = {
        {NULL, HEAD "R1,0,0,50\nB1,400,0\n", NULL, "points.csv", 3,
         "the row has 3 cells and the table 4 headings"},
        {NULL, HEAD "R1,0,0,50,6\n", NULL, "points.csv", 2,
         "the row has 5 cells and the table 4 headings; leave no cell out, and write a "
         "cell that holds the separator in quotes"},
        {NULL, "id,x [m],y [m],z [m],,\nR1,0,0,50,,6\n", NULL, "points.csv", 2,
         "the row has 6 cells and the table 4 headings"},
        {NULL, HEAD "R1,\"1,234\",0,50\n", NULL, "points.csv", 2,
         "x = \"1,234\" has a comma, between thousands or before decimals; write a "
         "decimal point, and nothing between thousands"},
        {NULL, HEAD "R1,1.234.500,0,50\n", NULL, "points.csv", 2,
         "x = \"1.234.500\" has marks between thousands"},
        {NULL, HEAD "R1,1_234,0,50\n", NULL, "points.csv", 2,
         "marks between thousands"},
        {NULL,
         HEAD "R1,1\xE2\x80\x87"
              "234,0,50\n",
         NULL, "points.csv", 2, "marks between thousands"},
        {NULL, HEAD "R1,1 1/2 m,0,50\n", NULL, "points.csv", 2,
         "'1/2 m' in '1 1/2 m' is not a unit"},
        {NULL, HEAD "R1,\"0,5\",0,50\n", NULL, "points.csv", 2,
         "x = \"0,5\" has a comma; write a decimal point, or say in the case file: "
         "tables = { decimal = \"comma\"; separator = \"semicolon\"; }"},
        {NULL, HEAD "R1,\"1,234.5\",0,50\n", NULL, "points.csv", 2,
         "x = \"1,234.5\" has marks between thousands; write the number without them"},
        {NULL, HEAD "R1,1 234.5,0,50\n", NULL, "points.csv", 2,
         "marks between thousands"},
        {NULL, HEAD "R1,1'234,0,50\n", NULL, "points.csv", 2,
         "marks between thousands"},
        {NULL,
         HEAD "R1,1\xC2\xA0"
              "234,0,50\n",
         NULL, "points.csv", 2, "marks between thousands"},
        {COMMA, "id;x [m];y [m];z [m]\nR1;1.234,5;0;50\n", NULL, "points.csv", 2,
         "marks between thousands"},
        {COMMA, "id;x [m];y [m];z [m]\nR1;1.5;0;50\n", NULL, "points.csv", 2,
         "x = \"1.5\" has a decimal point, and tables.decimal says comma"},
        {"tables = { decimal = \"comma\"; };", NULL, NULL, "case.cfg", 8,
         "a comma cannot stand between cells too; give separator = \"semicolon\" or "
         "\"tab\""},
        {NULL, "id,x [m],y [m],z\nR1,0,0,50\n", NULL, "points.csv", 2,
         "z = \"50\" has no unit; write it in the heading, as 'z [m]', or in the cell, "
         "as "
         "'50 m'"},
        {NULL, HEAD "R1,0,0,fifty\n", NULL, "points.csv", 2,
         "point \"R1\": z: 'fifty' does not start with a number"},
        {NULL, HEAD "R1,0,0,50 kg\n", NULL, "points.csv", 2,
         "point \"R1\": z: '50 kg' is not a length"},
        {NULL, HEAD "R1,0,0,\n", NULL, "points.csv", 2, "point \"R1\": 'z' is missing"},
        {NULL, HEAD "R1,0,0,90000\n", NULL, "points.csv", 2,
         "point \"R1\": z = \"90000 m\" is out of range; the range is -1000 to 9000 m"},
        {NULL, HEAD ",0,0,50\n", NULL, "points.csv", 2, "point 1: 'id' is missing"},
        {NULL, HEAD ROWS "R1,1,1,1\n", NULL, "points.csv", 5,
         "point \"R1\" is given twice, first at line 2"},
        {NULL, NULL, "id,route\nA,R1;B1\n", "pipes.csv", 2,
         "route = \"R1;B1\": the ids of a route are separated by spaces"},
        {NULL, NULL, "id,route,pipe_class\nA,R1 B2 E1,DI-EN545-C40-DN300\n",
         "pipes.csv", 2,
         "pipe \"A\": route: there is no point \"B2\"; did you mean \"B1\"?"},
        {NULL, NULL, "id,route,pipe_class\nA,R1,DI-EN545-C40-DN300\n", "pipes.csv", 2,
         "pipe \"A\": route has 1 point; it needs at least two"},
        {NULL, NULL, "id,route,poisson_ratio\nA,R1 B1 E1,high\n", "pipes.csv", 2,
         "pipe \"A\": poisson_ratio = \"high\" is a text where a number without unit "
         "belongs"},
        {NULL, "id,x [m],y [m],z [m],record\nR1,0,0,50,yes\n", NULL, "points.csv", 2,
         "point \"R1\": record = \"yes\" is a text where true or false belongs"},
        {NULL, HEAD "R1,0,0,\"50\n", NULL, "points.csv", 2, "never closed"},
        {NULL, HEAD "R1,0,0,50\nB\xFF,1,1,1\n", NULL, "points.csv", 3, "is not UTF-8"},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof FAULTS / sizeof FAULTS[0]; i++) {
        is_refused(c, &FAULTS[i]);
    }
    kent_catalogue_free(c);
}

static void an_id_of_list_and_table_alike_is_refused_with_both_places(void **state)
{
    (void)state;
    const fault twice = {
        "points = ( { id = \"B1\"; x = \"1 m\"; y = \"1 m\"; z = \"1 m\"; } "
        ");",
        NULL,
        NULL,
        "points.csv",
        3,
        "point \"B1\" is given twice, first at /"};
    kent_catalogue *c = read_catalogue();
    is_refused(c, &twice);
    kent_catalogue_free(c);
}

static void all_faults_of_both_tables_are_said_at_once(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = NULL;
    kent_complaints complaints;
    assert_int_equal(read_folder(c, TABLE_CASE, HEAD "R1,0,0\nB1,\"1,5\",0,30\n", 0,
                                 "id,rout\nA,R1 B1\n", &m, &complaints),
                     KENT_E_INPUT);
    assert_int_equal(complaints.count, 3);
    kent_catalogue_free(c);
}

static void a_table_that_cannot_be_had_is_said_where_it_is_named(void **state)
{
    (void)state;
    static const struct {
        const char *name, *part;
    } BAD[] = {
        {"none.csv",
         "points_file = \"none.csv\": No such file or directory; it is looked "
         "for as /tmp/kent-table-"},
        {"../points.csv", "leaves the folder of the case"},
        {"/tmp/points.csv", "leaves the folder of the case"},
        {".", "points_file = \".\" is not a file"},
        {"", "leaves the folder of the case"},
    };
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof BAD / sizeof BAD[0]; i++) {
        char name[40];
        kent_model *m = NULL;
        kent_complaints complaints;
        (void)snprintf(name, sizeof name, "\"%s\"", BAD[i].name);
        char *text = replaced(TABLE_CASE, "\"points.csv\"", name);
        assert_int_equal(
            read_folder(c, text, POINTS_TABLE, 0, PIPES_TABLE, &m, &complaints),
            KENT_E_INPUT);
        if (!strstr(complaints.kept[0].what, BAD[i].part)) {
            print_error("%s\n", complaints.kept[0].what);
        }
        assert_non_null(strstr(complaints.kept[0].what, BAD[i].part));
        assert_int_equal(complaints.kept[0].line, 2);
        free(text);
    }
    kent_catalogue_free(c);
}

static void bytes_that_are_no_text_are_refused(void **state)
{
    (void)state;
    static const char NUL[] = HEAD "R1,0,0,5\0"
                                   "0\n";
    static const char WIDE[] = "\xFF\xFEi\0d\0";
    kent_catalogue *c = read_catalogue();
    kent_model *m = NULL;
    kent_complaints complaints;
    assert_int_equal(
        read_folder(c, TABLE_CASE, NUL, sizeof NUL - 1, PIPES_TABLE, &m, &complaints),
        KENT_E_INPUT);
    assert_non_null(strstr(complaints.kept[0].what, "NUL byte"));
    assert_int_equal(complaints.kept[0].line, 2);
    assert_int_equal(
        read_folder(c, TABLE_CASE, WIDE, sizeof WIDE - 1, PIPES_TABLE, &m, &complaints),
        KENT_E_INPUT);
    assert_non_null(strstr(complaints.kept[0].what, "UTF-16"));
    kent_catalogue_free(c);
}

static void many_points_off_the_main_are_counted_not_listed(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_text points = {0};
    kent_text_add(&points, "%s", POINTS_TABLE);
    for (int i = 0; i < 30; i++) {
        kent_text_add(&points, "S%d,%d,9,1\n", i, i);
    }
    kent_model *m = read_tables(c, TABLE_CASE, kent_text_of(&points), PIPES_TABLE);
    size_t named = 0;
    bool counted = false;
    for (size_t i = 0; i < m->cautions.count; i++) {
        const char *text = m->cautions.text[i];
        if (!strstr(text, "on no pipe's route")) continue;
        named += strstr(text, "point \"S") != NULL;
        counted = counted || strncmp(text, "20 more points", 14) == 0;
    }
    assert_int_equal(named, 10);
    assert_true(counted);
    kent_model_free(m);
    kent_text_clear(&points);
    kent_catalogue_free(c);
}

/* The text of the n-th block in ``` after a heading of the manual. */
static char *block_of_manual(const char *manual, const char *heading, size_t n)
{
    const char *p = strstr(manual, heading);
    assert_non_null(p);
    for (size_t i = 0; i < 2 * n + 1; i++) {
        p = strstr(p, "```\n");
        assert_non_null(p);
        p += 4;
    }
    const char *end = strstr(p, "```\n");
    assert_non_null(end);
    char *out = kent_alloc((size_t)(end - p) + 1, 1);
    assert_non_null(out);
    memcpy(out, p, (size_t)(end - p));
    return out;
}

static void the_example_of_the_manual_is_read(void **state)
{
    (void)state;
    static char manual[1 << 18];
    kent_catalogue *c = read_catalogue();
    FILE *file = fopen(KENT_SOURCE_DIR "/docs/case-format.md", "rb");
    assert_non_null(file);
    const size_t size = fread(manual, 1, sizeof manual - 1, file);
    assert_true(size > 0 && size < sizeof manual - 1);
    assert_int_equal(fclose(file), 0);
    char *names = block_of_manual(manual, "\n## Tables\n", 0);
    char *points = block_of_manual(manual, "\n## Tables\n", 1);
    char *pipes = block_of_manual(manual, "\n## Tables\n", 2);
    char text[1024];
    (void)snprintf(text, sizeof text,
                   "format = 1;\n%sfixed_levels = ( { at = \"R1\"; level = \"80 m\"; } "
                   ");\nground = { soil = \"sand-SP\"; cover = \"1.2 m\"; };\n",
                   names);
    kent_model *m = read_tables(c, text, points, pipes);
    assert_int_equal(m->point_count, 3);
    assert_close(m->points[0].cover, 4.0 * 0.3048, 1e-12);
    assert_true(isnan(m->points[1].cover));
    assert_close(m->points[2].cover, 1.5, 1e-12);
    assert_int_equal(m->pipes[0].route_count, 3);
    kent_model_free(m);
    free(names);
    free(points);
    free(pipes);
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_main_from_tables_is_the_main_from_lists),
        cmocka_unit_test(the_checksum_takes_in_the_tables),
        cmocka_unit_test(lists_and_tables_add_up),
        cmocka_unit_test(every_way_of_writing_gives_the_same_points),
        cmocka_unit_test(every_type_of_value_stands_in_a_cell),
        cmocka_unit_test(faults_of_headings_say_what_would_be_right),
        cmocka_unit_test(faults_of_cells_say_what_would_be_right),
        cmocka_unit_test(an_id_of_list_and_table_alike_is_refused_with_both_places),
        cmocka_unit_test(all_faults_of_both_tables_are_said_at_once),
        cmocka_unit_test(a_table_that_cannot_be_had_is_said_where_it_is_named),
        cmocka_unit_test(bytes_that_are_no_text_are_refused),
        cmocka_unit_test(many_points_off_the_main_are_counted_not_listed),
        cmocka_unit_test(the_example_of_the_manual_is_read),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
