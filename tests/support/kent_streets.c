#include "kent_streets.h"

#include <stdio.h>
#include <unistd.h>

static const double BLOCK = 80.0; /* m between streets */

static const char CASE[] =
    "format = 1;\n"
    "title = \"Streets of Fennick Moor\";\n"
    "points_file = \"points.csv\";\n"
    "pipes_file = \"pipes.csv\";\n"
    "fixed_levels = ( { at = \"P0-0\"; level = \"120 m\"; } );\n"
    "outflows = ( { at = \"P100-100\"; flow = \"20 L/s\"; } );\n"
    "ground = { soil = \"sand-SP\"; cover = \"1.2 m\"; water_table = \"none\"; };\n";

size_t kent_streets_points(void)
{
    return (size_t)KENT_STREETS_CROSSINGS * KENT_STREETS_CROSSINGS;
}

size_t kent_streets_pipes(void)
{
    return 2 * (size_t)KENT_STREETS_CROSSINGS * (KENT_STREETS_CROSSINGS - 1);
}

static void write_points(FILE *file)
{
    (void)fprintf(file, "id,x [m],y [m],z [m],cover [ft],water_table [m],soil\n");
    for (int i = 0; i < KENT_STREETS_CROSSINGS; i++) {
        for (int j = 0; j < KENT_STREETS_CROSSINGS; j++) {
            (void)fprintf(file, "P%d-%d,%.1f,%.1f,%.3f,%s,%s,%s\n", i, j, BLOCK * i,
                          BLOCK * j, 70.0 - 0.08 * i - 0.05 * j, j % 3 ? "4.5" : "",
                          j % 5 ? "" : "2.4", i % 7 ? "" : "silt-ML");
        }
    }
}

/* One size throughout, so that no crossing is a reducer as well. */
static void write_pipe(FILE *file, int i, int j, int to_i, int to_j)
{
    (void)fprintf(file,
                  "S%d-%d-%d-%d,P%d-%d P%d-%d,DI-EN545-C40-DN150,push-on,0.1,3,6\n", i,
                  j, to_i, to_j, i, j, to_i, to_j);
}

static void write_pipes(FILE *file)
{
    (void)fprintf(file,
                  "id,route,pipe_class,joint,roughness [mm],joint_deflection [deg],"
                  "pipe_length [m]\n");
    for (int i = 0; i < KENT_STREETS_CROSSINGS; i++) {
        for (int j = 0; j < KENT_STREETS_CROSSINGS; j++) {
            if (i + 1 < KENT_STREETS_CROSSINGS) write_pipe(file, i, j, i + 1, j);
            if (j + 1 < KENT_STREETS_CROSSINGS) write_pipe(file, i, j, i, j + 1);
        }
    }
}

static void write_case(FILE *file) { (void)fputs(CASE, file); }

static const struct {
    const char *name;
    void (*write)(FILE *);
} FILES[] = {
    {"case.cfg", write_case}, {"points.csv", write_points}, {"pipes.csv", write_pipes}};

int kent_streets_write(const char *folder, char *path, size_t size)
{
    for (size_t i = 0; i < sizeof FILES / sizeof FILES[0]; i++) {
        char name[256];
        (void)snprintf(name, sizeof name, "%s/%s", folder, FILES[i].name);
        FILE *file = fopen(name, "wb");
        if (!file) return -1;
        FILES[i].write(file);
        const int bad = ferror(file);
        if (fclose(file) != 0 || bad) return -1;
    }
    (void)snprintf(path, size, "%s/%s", folder, FILES[0].name);
    return 0;
}

void kent_streets_remove(const char *folder)
{
    for (size_t i = 0; i < sizeof FILES / sizeof FILES[0]; i++) {
        char name[256];
        (void)snprintf(name, sizeof name, "%s/%s", folder, FILES[i].name);
        (void)unlink(name);
    }
    (void)rmdir(folder);
}
