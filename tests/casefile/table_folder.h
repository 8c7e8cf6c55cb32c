/* For tests of tables: a folder with a case and its two tables. */
#ifndef KENT_TABLE_FOLDER_H
#define KENT_TABLE_FOLDER_H

#include "case_text.h"

#include <sys/stat.h>

/* A main that reads without complaint, from tables. */
static const char TABLE_CASE[] =
    "format = 1;\n"
    "points_file = \"points.csv\";\n"
    "pipes_file = \"pipes.csv\";\n"
    "fixed_levels = ( { at = \"R1\"; level = \"80 m\"; } );\n"
    "valves = ( { id = \"V1\"; at = \"E1\"; type = \"butterfly\"; size = \"300 mm\";\n"
    "  flow = \"100 L/s\"; discharge_level = \"21 m\"; } );\n"
    "ground = { soil = \"sand-SP\"; cover = \"1.2 m\"; water_table = \"none\"; };\n";

static const char POINTS_TABLE[] = "id,x [m],y [m],z [m]\n"
                                   "R1,0,0,50\n"
                                   "B1,400,0,30\n"
                                   "E1,700,300,20\n";

static const char PIPES_TABLE[] = "id,route,pipe_class,joint\n"
                                  "A,R1 B1 E1,DI-EN545-C40-DN300,push-on\n";

static inline void write_into(const char *folder, const char *name, const char *bytes,
                              size_t size)
{
    char path[128];
    (void)snprintf(path, sizeof path, "%s/%s", folder, name);
    if (!bytes) {
        (void)unlink(path);
        return;
    }
    FILE *file = fopen(path, "wb");
    assert_non_null(file);
    assert_int_equal(fwrite(bytes, 1, size, file), size);
    assert_int_equal(fclose(file), 0);
}

/* Reads a case with these three files; a table that is NULL is not there. Bytes of
 * points: points_size, or up to its NUL where that is 0. *out may be NULL afterwards.
 */
static inline kent_status read_folder(const kent_catalogue *catalogue, const char *text,
                                      const char *points, size_t points_size,
                                      const char *pipes, kent_model **out,
                                      kent_complaints *complaints)
{
    char folder[] = "/tmp/kent-table-XXXXXX";
    char path[128];
    kent_error err = {0};
    assert_non_null(mkdtemp(folder));
    if (points && points_size == 0) points_size = strlen(points);
    write_into(folder, "case.cfg", text, strlen(text));
    write_into(folder, "points.csv", points, points_size);
    write_into(folder, "pipes.csv", pipes, pipes ? strlen(pipes) : 0);
    *complaints = (kent_complaints){0};
    *out = NULL;
    (void)snprintf(path, sizeof path, "%s/case.cfg", folder);
    const kent_status status =
        kent_case_read(path, catalogue, NULL, out, complaints, &err);
    write_into(folder, "case.cfg", NULL, 0);
    write_into(folder, "points.csv", NULL, 0);
    write_into(folder, "pipes.csv", NULL, 0);
    assert_int_equal(rmdir(folder), 0);
    return status;
}

#endif
