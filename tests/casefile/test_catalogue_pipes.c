/* config/pipes.cfg against the standards it was taken from: every size, diameter, wall
 * and rating. */
#include "case_text.h"

#include <math.h>

static const double MM = 0.001;                                /* m */
static const double IN = 0.0254;                               /* m */
static const double BAR = 1e5;                                 /* Pa */
static const double PSI = 4.4482216152605 / (0.0254 * 0.0254); /* Pa */

static const kent_pipe_class *sure_pipe(const kent_catalogue *c, const char *id)
{
    const kent_pipe_class *p = kent_catalogue_pipe(c, id);
    if (!p) print_error("no %s\n", id);
    assert_non_null(p);
    return p;
}

static const kent_pipe_class *pipe_of(const kent_catalogue *c, const char *before,
                                      double size, const char *after)
{
    char id[80];
    (void)snprintf(id, sizeof id, "%s%g%s", before, size, after);
    return sure_pipe(c, id);
}

static size_t count_of(const kent_catalogue *c, const char *start, const char *end)
{
    size_t count = 0;
    for (size_t i = 0; i < c->pipe_count; i++) {
        const char *id = c->pipes[i].id;
        const size_t length = strlen(id);
        if (length >= strlen(end) && strncmp(id, start, strlen(start)) == 0 &&
            strcmp(id + length - strlen(end), end) == 0) {
            count++;
        }
    }
    return count;
}

/* ---- published tables ------------------------------------------------------------ */

enum { COLUMNS = 9, ROWS_MOST = 32 };

typedef struct published {
    char classes[COLUMNS][16];        /* [2 ..]: the classes */
    double cells[ROWS_MOST][COLUMNS]; /* size, outside, walls; NAN: not made */
    size_t rows;
} published;

static void read_published(const char *name, published *out)
{
    char path[300];
    char line[300];
    size_t lines = 0;
    (void)snprintf(path, sizeof path, "%s/tests/casefile/published/%s", KENT_SOURCE_DIR,
                   name);
    FILE *file = fopen(path, "r");
    assert_non_null(file);
    *out = (published){0};
    while (fgets(line, sizeof line, file)) {
        char *rest = line;
        if (line[0] == '#') continue;
        for (size_t k = 0; k < COLUMNS; k++) {
            const char *cell = strsep(&rest, ",\n");
            assert_non_null(cell);
            if (lines == 0) {
                (void)snprintf(out->classes[k], sizeof out->classes[k], "%.15s", cell);
            } else {
                assert_true(out->rows < ROWS_MOST);
                out->cells[out->rows][k] =
                    cell[0] != '\0' ? strtod(cell, NULL) : (double)NAN;
            }
        }
        if (lines++ > 0) out->rows++;
    }
    assert_int_equal(fclose(file), 0);
    assert_true(out->rows > 0);
}

/* Every cell of a table is a pipe of the catalogue, and the catalogue has no more. */
static void compare(const kent_catalogue *c, const published *t, const char *start,
                    const char *before, const char *after, double unit, bool minimum)
{
    size_t found = 0;
    for (size_t i = 0; i < t->rows; i++) {
        for (size_t k = 2; k < COLUMNS; k++) {
            char lead[40];
            if (isnan(t->cells[i][k])) continue;
            (void)snprintf(lead, sizeof lead, "%s%s-%s", start, t->classes[k], before);
            const kent_pipe_class *p = pipe_of(c, lead, t->cells[i][0], after);
            assert_close(p->outside_diameter, t->cells[i][1] * unit, 1e-12);
            assert_close(minimum ? p->wall_minimum : p->wall, t->cells[i][k] * unit,
                         1e-12);
            found++;
        }
    }
    for (size_t k = 2; k < COLUMNS; k++) {
        char lead[40];
        (void)snprintf(lead, sizeof lead, "%s%s-", start, t->classes[k]);
        found -= count_of(c, lead, "");
    }
    assert_int_equal(found, 0);
}

/* EN 545:2010, outside diameters and minimum walls, every cell; nominal = minimum + 1.3
 * mm + 0.001 DN and PFA = class, PMA = 1.2 PFA, PEA = PMA + 5 bar from memory. */
static void ductile_iron_of_en_545_is_that_of_the_standard(void **state)
{
    (void)state;
    published table;
    read_published("en_545.csv", &table);
    kent_catalogue *c = read_catalogue();
    assert_int_equal(table.rows, 15);
    compare(c, &table, "DI-EN545-", "DN", "", MM, true);
    for (size_t i = 0; i < c->pipe_count; i++) {
        const kent_pipe_class *p = &c->pipes[i];
        if (strncmp(p->id, "DI-EN545-C", 10) != 0) continue;
        const double class_of = strtod(p->id + 10, NULL); /* bar */
        const double size = strtod(strstr(p->id, "DN") + 2, NULL);
        assert_close(p->wall, p->wall_minimum + 1.3 * MM + 0.001 * size * MM, 1e-12);
        assert_close(p->pressure_rating, class_of * BAR, 1e-12);
        assert_close(p->surge_rating, 1.2 * class_of * BAR, 1e-12);
        assert_close(p->test_rating, (1.2 * class_of + 5.0) * BAR, 1e-12);
        assert_true(isnan(p->recurring_rating));
        assert_string_equal(p->material, "ductile-iron");
        /* cement mortar: 4 mm to DN 300, 5 mm to DN 600, then 6 mm; from memory */
        const double lining = size <= 300.0 ? 4.0 : size <= 600.0 ? 5.0 : 6.0;
        assert_close(p->lining, lining * MM, 1e-12);
    }
    kent_catalogue_free(c);
}

/* EN 545:2010, preferred classes (from memory): e = C (OD - e) 3/(20 x 420), mm and
 * bar, to 0.1 mm, and no less than 3.0, 3.5, 4.0 and 4.7 mm. */
static void walls_of_en_545_follow_from_the_class(void **state)
{
    (void)state;
    static const double SIZES[] = {80,  100, 125, 150, 200, 250, 300, 350,
                                   400, 500, 600, 700, 800, 900, 1000};
    static const double CLASSES[][2] = {{40, 3.0}, {50, 3.5}, {64, 4.0}, {100, 4.7}};
    kent_catalogue *c = read_catalogue();
    size_t found = 0;
    for (size_t i = 0; i < sizeof SIZES / sizeof SIZES[0]; i++) {
        for (size_t k = 0; k < sizeof CLASSES / sizeof CLASSES[0]; k++) {
            char id[KENT_ID];
            const double class_of = CLASSES[k][0]; /* bar */
            (void)snprintf(id, sizeof id, "DI-EN545-C%g-DN%g", class_of, SIZES[i]);
            const kent_pipe_class *p = kent_catalogue_pipe(c, id);
            if (!p) continue; /* not made */
            const double share = class_of * 3.0 / (20.0 * 420.0);
            const double wall = share * p->outside_diameter / MM / (1.0 + share);
            assert_within(p->wall_minimum / MM, fmax(wall, CLASSES[k][1]), 0.06);
            found++;
        }
    }
    assert_int_equal(found, 54);
    kent_catalogue_free(c);
}

typedef struct iron_row {
    double size, outside, tolerance, lining; /* in */
} iron_row;

/* AWWA C151, outside diameters (seen; 54 in is that of the tables since 1991), casting
 * tolerances and the lining of AWWA C104 (from memory). */
static const iron_row IRON[] = {
    {3, 3.96, .05, .0625},    {4, 4.80, .05, .0625},    {6, 6.90, .05, .0625},
    {8, 9.05, .05, .0625},    {10, 11.10, .06, .0625},  {12, 13.20, .06, .0625},
    {14, 15.30, .07, .09375}, {16, 17.40, .07, .09375}, {18, 19.50, .07, .09375},
    {20, 21.60, .07, .09375}, {24, 25.80, .07, .09375}, {30, 32.00, .07, .125},
    {36, 38.30, .07, .125},   {42, 44.50, .07, .125},   {48, 50.80, .08, .125},
    {54, 57.56, .09, .125},   {60, 61.61, .09, .125},   {64, 65.67, .09, .125}};
enum { IRON_SIZES = sizeof IRON / sizeof IRON[0] };

static void special_classes_of_awwa_c151_are_those_of_the_standard(void **state)
{
    (void)state;
    published table;
    read_published("awwa_c151.csv", &table);
    kent_catalogue *c = read_catalogue();
    assert_int_equal(table.rows, 15);
    compare(c, &table, "DI-C151-", "", "in", IN, false);
    for (size_t i = 1; i < 16; i++) { /* 4 to 54 in */
        const kent_pipe_class *p = pipe_of(c, "DI-C151-TC52-", IRON[i].size, "in");
        assert_close(p->outside_diameter, IRON[i].outside * IN, 1e-12);
        assert_close(p->wall_minimum, p->wall - IRON[i].tolerance * IN, 1e-12);
        assert_close(p->lining, IRON[i].lining * IN, 1e-12);
        assert_true(isnan(p->pressure_rating) && isnan(p->surge_rating));
    }
    kent_catalogue_free(c);
}

/* AWWA C150/C151: published walls of pressure classes, 12, 24 and 48 in class 350 and
 * 54, 60 and 64 in every class; 42 in class 300 by the formula (one published table
 * misprints it). */
static void pressure_classes_of_awwa_c151_have_the_published_walls(void **state)
{
    (void)state;
    static const double WALLS[][5] = {{0.51, 0.58, 0.65, 0.72, 0.79},
                                      {0.54, 0.61, 0.68, 0.76, 0.83},
                                      {0.56, 0.64, 0.72, 0.80, 0.87}};
    kent_catalogue *c = read_catalogue();
    assert_close(sure_pipe(c, "DI-C151-PC350-12in")->wall, 0.28 * IN, 1e-12);
    assert_close(sure_pipe(c, "DI-C151-PC350-24in")->wall, 0.43 * IN, 1e-12);
    assert_close(sure_pipe(c, "DI-C151-PC350-48in")->wall, 0.70 * IN, 1e-12);
    assert_close(sure_pipe(c, "DI-C151-PC300-42in")->wall, 0.57 * IN, 1e-12);
    for (size_t i = 0; i < 3; i++) {
        for (size_t k = 0; k < 5; k++) {
            char lead[32];
            (void)snprintf(lead, sizeof lead, "DI-C151-PC%zu-", 150 + 50 * k);
            assert_close(pipe_of(c, lead, IRON[15 + i].size, "in")->wall,
                         WALLS[i][k] * IN, 1e-12);
        }
    }
    kent_catalogue_free(c);
}

/* AWWA C150: t = 2 (P + 100 psi) D/(2 x 42 000 psi) + 0.08 in + casting tolerance, at
 * least 0.25 in, to 0.01 in. The surge allowance of 100 psi is on top of the class. */
static void walls_of_pressure_classes_follow_the_formula_of_awwa_c150(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < IRON_SIZES; i++) {
        for (int psi = 150; psi <= 350; psi += 50) {
            char lead[32];
            (void)snprintf(lead, sizeof lead, "DI-C151-PC%d-", psi);
            const kent_pipe_class *p = pipe_of(c, lead, IRON[i].size, "in");
            const double wall =
                (psi + 100.0) * IRON[i].outside / 42000.0 + 0.08 + IRON[i].tolerance;
            assert_close(p->outside_diameter, IRON[i].outside * IN, 1e-12);
            assert_within(p->wall / IN, fmax(wall, 0.25), 0.00501);
            assert_within(100.0 * p->wall / IN, round(100.0 * p->wall / IN), 1e-9);
            assert_close(p->wall_minimum, p->wall - IRON[i].tolerance * IN, 1e-12);
            assert_close(p->lining, IRON[i].lining * IN, 1e-12);
            assert_close(p->pressure_rating, psi * PSI, 1e-12);
            assert_close(p->surge_rating, (psi + 100.0) * PSI, 1e-12);
            assert_true(isnan(p->recurring_rating));
            assert_true(isnan(p->test_rating));
        }
    }
    assert_int_equal(count_of(c, "DI-C151-PC", "in"), 5 * IRON_SIZES);
    kent_catalogue_free(c);
}

/* ---- plastics -------------------------------------------------------------------- */

/* What every pipe of a table by diameter ratio keeps: its wall, and the mean one 6 %
 * above it (from memory). */
static void check_ratio(const kent_pipe_class *p, double outside, double ratio,
                        double rating)
{
    assert_close(p->outside_diameter, outside, 1e-12);
    assert_close(p->wall_minimum, outside / ratio, 1e-12);
    assert_close(p->wall, 1.06 * outside / ratio, 1e-12);
    assert_close(p->lining, 0.0, 1e-12);
    assert_close(p->pressure_rating, rating, 1e-12);
    assert_true(isnan(p->test_rating));
}

typedef struct ratio_row {
    double ratio, label; /* -; psi or bar */
    double least, most;  /* sizes made */
} ratio_row;

/* AWWA C900: class 2 x 2000 psi/(DR - 1) (formula seen; 235 for DR 18 in Moser and
 * Folkman, example 4.2, p. 220; other labels from memory, rounded down to 5 psi),
 * occasional surges 1.60 of it (ibid.: 376 psi), recurring ones 1.00 (seen). Iron
 * outside diameters (from memory). */
static void pvc_of_awwa_c900_is_rated_by_its_ratio(void **state)
{
    (void)state;
    static const ratio_row CLASSES[] = {
        {14, 305, 4, 12},  {18, 235, 4, 24},    {21, 200, 14, 36}, {25, 165, 4, 48},
        {26, 160, 14, 48}, {32.5, 125, 14, 60}, {41, 100, 14, 60}, {51, 80, 30, 60}};
    kent_catalogue *c = read_catalogue();
    size_t made = 0;
    for (size_t k = 0; k < sizeof CLASSES / sizeof CLASSES[0]; k++) {
        const ratio_row *row = &CLASSES[k];
        char lead[32];
        (void)snprintf(lead, sizeof lead, "PVC-C900-DR%g-", row->ratio);
        assert_true(row->label <= 4000.0 / (row->ratio - 1.0));
        assert_true(row->label > 4000.0 / (row->ratio - 1.0) - 5.0);
        for (size_t i = 1; i < IRON_SIZES - 1; i++) { /* 4 to 60 in */
            if (IRON[i].size < row->least || IRON[i].size > row->most) continue;
            const kent_pipe_class *p = pipe_of(c, lead, IRON[i].size, "in");
            check_ratio(p, IRON[i].outside * IN, row->ratio, row->label * PSI);
            assert_close(p->surge_rating, 1.6 * row->label * PSI, 1e-12);
            assert_close(p->recurring_rating, row->label * PSI, 1e-12);
            assert_string_equal(p->standard, "AWWA C900-16");
            assert_string_equal(p->material, "PVC-12454");
            made++;
        }
    }
    assert_int_equal(count_of(c, "PVC-C900-", ""), made);
    assert_close(sure_pipe(c, "PVC-C900-DR18-8in")->surge_rating, 376.0 * PSI, 1e-12);
    kent_catalogue_free(c);
}

/* AWWA C906: class 2 x 1000 psi/(DR - 1) (formula seen; from memory rounded down to
 * whole psi), occasional surges 2.0 of it, recurring ones 1.5 (AWWA M55, seen). Outside
 * diameters in iron-pipe sizes (ASME B36.10, from memory) and of iron. */
static void pe4710_is_rated_by_its_ratio(void **state)
{
    (void)state;
    static const ratio_row CLASSES[] = {
        {7.3, 317, 0, 24}, {9, 250, 0, 36},  {11, 200, 0, 48}, {13.5, 160, 0, 54},
        {17, 125, 0, 54},  {21, 100, 0, 54}, {26, 80, 0, 54},  {32.5, 63, 0, 54}};
    static const double SIZES[][2] = {
        {3, 3.5},    {4, 4.5}, {5, 5.563}, {6, 6.625}, {8, 8.625}, {10, 10.75},
        {12, 12.75}, {14, 14}, {16, 16},   {18, 18},   {20, 20},   {22, 22},
        {24, 24},    {26, 26}, {28, 28},   {30, 30},   {32, 32},   {34, 34},
        {36, 36},    {42, 42}, {48, 48},   {54, 54}};
    kent_catalogue *c = read_catalogue();
    size_t made = 0;
    for (size_t k = 0; k < sizeof CLASSES / sizeof CLASSES[0]; k++) {
        const ratio_row *row = &CLASSES[k];
        char lead[32];
        (void)snprintf(lead, sizeof lead, "PE4710-DR%g-", row->ratio);
        assert_within(row->label, 2000.0 / (row->ratio - 1.0), 1.0);
        for (size_t i = 0; i < sizeof SIZES / sizeof SIZES[0]; i++) {
            if (SIZES[i][0] > row->most) continue;
            const kent_pipe_class *p = pipe_of(c, lead, SIZES[i][0], "in-IPS");
            check_ratio(p, SIZES[i][1] * IN, row->ratio, row->label * PSI);
            assert_close(p->surge_rating, 2.0 * row->label * PSI, 1e-12);
            assert_close(p->recurring_rating, 1.5 * row->label * PSI, 1e-12);
            made++;
        }
        for (size_t i = 1; i < 15; i++) { /* 4 to 48 in */
            if (IRON[i].size > row->most) continue;
            const kent_pipe_class *p = pipe_of(c, lead, IRON[i].size, "in-DIPS");
            check_ratio(p, IRON[i].outside * IN, row->ratio, row->label * PSI);
            assert_close(p->surge_rating, 2.0 * row->label * PSI, 1e-12);
            assert_close(p->recurring_rating, 1.5 * row->label * PSI, 1e-12);
            made++;
        }
    }
    assert_int_equal(count_of(c, "PE4710-", ""), made);
    kent_catalogue_free(c);
}

/* Pipes by their outside diameters in mm, each class in all sizes from least to most.
 */
static void check_metric(const char *id, const ratio_row *rows, size_t count,
                         double design_stress)
{
    static const double SIZES[] = {63,  75,  90,  110, 125, 140, 160,  180,
                                   200, 225, 250, 280, 315, 355, 400,  450,
                                   500, 560, 630, 710, 800, 900, 1000, 1200};
    kent_catalogue *c = read_catalogue();
    size_t made = 0;
    for (size_t k = 0; k < count; k++) {
        char lead[32];
        (void)snprintf(lead, sizeof lead, "%s-SDR%g-DN", id, rows[k].ratio);
        /* the label is the number of the R10 series next to the formula; bar */
        assert_close(rows[k].label, 20.0 * design_stress / (rows[k].ratio - 1.0), 0.07);
        for (size_t i = 0; i < sizeof SIZES / sizeof SIZES[0]; i++) {
            if (SIZES[i] < rows[k].least || SIZES[i] > rows[k].most) continue;
            const kent_pipe_class *p = pipe_of(c, lead, SIZES[i], "");
            check_ratio(p, SIZES[i] * MM, rows[k].ratio, rows[k].label * BAR);
            assert_true(isnan(p->surge_rating) && isnan(p->recurring_rating));
            assert_string_equal(p->material, id);
            made++;
        }
    }
    char start[32];
    (void)snprintf(start, sizeof start, "%s-", id);
    assert_int_equal(count_of(c, start, ""), made);
    kent_catalogue_free(c);
}

/* EN 12201-2 and ISO 4427-2 (from memory): PN = 20 MRS/(C (SDR - 1)), MRS 10 MPa and C
 * = 1.25. */
static void pe100_is_rated_by_its_ratio(void **state)
{
    (void)state;
    static const ratio_row CLASSES[] = {{9, 20, 63, 630},       {11, 16, 63, 1000},
                                        {13.6, 12.5, 63, 1200}, {17, 10, 63, 1200},
                                        {21, 8, 63, 1200},      {26, 6, 63, 1200}};
    check_metric("PE100", CLASSES, sizeof CLASSES / sizeof CLASSES[0], 10.0 / 1.25);
}

/* EN ISO 1452-2 (from memory): MRS 25 MPa and C = 2.0 above DN 90. */
static void pvc_u_is_rated_by_its_ratio(void **state)
{
    (void)state;
    static const ratio_row CLASSES[] = {{17, 16, 110, 630},
                                        {21, 12.5, 110, 630},
                                        {26, 10, 110, 630},
                                        {33, 8, 110, 630},
                                        {41, 6, 110, 630}};
    check_metric("PVC-U", CLASSES, sizeof CLASSES / sizeof CLASSES[0], 25.0 / 2.0);
}

/* EN 12201-2, table of walls of SDR 11 and 17 (from memory): what outside diameter/SDR
 * gives is within 1.5 and 2.6 % of it, the tables rounding up. */
static void walls_of_pe100_are_near_those_of_the_standards_table(void **state)
{
    (void)state;
    static const double ROWS[][3] = {
        {63, 5.8, 3.8},    {110, 10.0, 6.6},  {160, 14.6, 9.5},
        {200, 18.2, 11.9}, {250, 22.7, 14.8}, {315, 28.6, 18.7},
        {400, 36.3, 23.7}, {500, 45.4, 29.7}, {630, 57.2, 37.4}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_pipe_class *thick = pipe_of(c, "PE100-SDR11-DN", ROWS[i][0], "");
        const kent_pipe_class *thin = pipe_of(c, "PE100-SDR17-DN", ROWS[i][0], "");
        assert_close(thick->wall_minimum / MM, ROWS[i][1], 0.015);
        assert_close(thin->wall_minimum / MM, ROWS[i][2], 0.026);
    }
    kent_catalogue_free(c);
}

/* ---- steel ----------------------------------------------------------------------- */

/* EN 10220 and ISO 4200, outside diameters; ASME B36.10M, weights STD and XS with a
 * mill tolerance of 12.5 %; all from memory. */
static void steel_has_the_diameters_and_walls_of_its_standards(void **state)
{
    (void)state;
    static const double METRIC[][2] = {
        {100, 114.3}, {150, 168.3}, {200, 219.1}, {250, 273.0},   {300, 323.9},
        {350, 355.6}, {400, 406.4}, {450, 457.0}, {500, 508.0},   {600, 610.0},
        {700, 711.0}, {800, 813.0}, {900, 914.0}, {1000, 1016.0}, {1200, 1219.0}};
    static const double WALLS[][3] = {/* mm, made from and to DN */
                                      {5, 0, 300},
                                      {6.3, 0, 600},
                                      {8, 200, 1200},
                                      {10, 300, 1200},
                                      {12.5, 400, 1200}};
    static const double INCH[][4] = {
        {4, 4.5, .237, .337},  {6, 6.625, .280, .432}, {8, 8.625, .322, .500},
        {10, 10.75, .365, .5}, {12, 12.75, .375, .5},  {14, 14, .375, .5},
        {16, 16, .375, .5},    {18, 18, .375, .5},     {20, 20, .375, .5},
        {24, 24, .375, .5},    {30, 30, .375, .5},     {36, 36, .375, .5},
        {42, 42, .375, .5},    {48, 48, .375, .5}};
    kent_catalogue *c = read_catalogue();
    size_t made = 0;
    for (size_t i = 0; i < sizeof METRIC / sizeof METRIC[0]; i++) {
        for (size_t k = 0; k < 5; k++) {
            char lead[32];
            if (METRIC[i][0] < WALLS[k][1] || METRIC[i][0] > WALLS[k][2]) continue;
            (void)snprintf(lead, sizeof lead, "ST-EN10220-W%g-DN", WALLS[k][0]);
            const kent_pipe_class *p = pipe_of(c, lead, METRIC[i][0], "");
            assert_close(p->outside_diameter, METRIC[i][1] * MM, 1e-12);
            assert_close(p->wall, WALLS[k][0] * MM, 1e-12);
            assert_close(p->lining, 0.0, 1e-12);
            assert_true(isnan(p->wall_minimum) && isnan(p->pressure_rating));
            made++;
        }
    }
    assert_int_equal(count_of(c, "ST-EN10220-", ""), made);
    for (size_t i = 0; i < sizeof INCH / sizeof INCH[0]; i++) {
        const kent_pipe_class *std = pipe_of(c, "ST-B36.10-STD-", INCH[i][0], "in");
        const kent_pipe_class *xs = pipe_of(c, "ST-B36.10-XS-", INCH[i][0], "in");
        assert_close(std->outside_diameter, INCH[i][1] * IN, 1e-12);
        assert_close(std->wall, INCH[i][2] * IN, 1e-12);
        assert_close(std->wall_minimum, 0.875 * INCH[i][2] * IN, 1e-12);
        assert_close(xs->outside_diameter, INCH[i][1] * IN, 1e-12);
        assert_close(xs->wall, INCH[i][3] * IN, 1e-12);
        assert_within(std->lining + xs->lining, 0.0, 1e-12);
        assert_true(isnan(std->pressure_rating) && isnan(xs->pressure_rating));
    }
    assert_int_equal(count_of(c, "ST-B36.10-", ""), 28);
    kent_catalogue_free(c);
}

/* ---- wave speeds ----------------------------------------------------------------- */

/* ft/s: thin wall, joints that move, without lining, with this modulus of water and
 * speed of sound in it. */
static double speed(const kent_catalogue *c, const char *id, double wall, double bulk,
                    double sound_ft)
{
    const kent_pipe_class *p = sure_pipe(c, id);
    const kent_material *m = kent_catalogue_material(c, p->material);
    const kent_wall ring = {.bore = p->outside_diameter - 2.0 * wall,
                            .thickness = wall,
                            .modulus = m->modulus};
    const double sound = sound_ft * 0.3048; /* m/s */
    return kent_wave_speed(&ring, KENT_FLEXIBLE_JOINTS, true, bulk / (sound * sound),
                           bulk) /
           0.3048;
}

/* Moser and Folkman, Buried Pipe Design, table 4.1, p. 189: classes 52, 56 and 50. The
 * moduli are fitted to the table, which prints neither; the catalogue's iron has 170
 * GPa where the fit has 165.5, worth 0.3 %. */
static void waves_in_iron_are_as_fast_as_a_published_table_says(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double speed; /* ft/s */
    } ROWS[] = {{"DI-C151-TC52-12in", 4038},
                {"DI-C151-TC56-4in", 4567},
                {"DI-C151-TC50-20in", 3655}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_pipe_class *p = sure_pipe(c, ROWS[i].id);
        assert_close(speed(c, ROWS[i].id, p->wall, 317000.0 * PSI, 4850.8),
                     ROWS[i].speed, 0.008);
    }
    kent_catalogue_free(c);
}

/* AWWA M23 (from memory): K 300 ksi, E 400 ksi, 4660 ft/s in water: DR 14, 18 and 25.
 * Moser and Folkman, example 4.2, p. 220 (AWWA C900): 1311 ft/s for DR 18, from 4720
 * ft/s in water. The two constants are in conflict by 1.3 %. PE: handbook of
 * polyethylene pipe and AWWA M55 (from memory), K 300 ksi, E 150 ksi: DR 9, 11 and 17.
 * All on the least wall. */
static void waves_in_plastic_are_as_fast_as_the_handbooks_say(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double water, speed; /* ft/s */
    } ROWS[] = {{"PVC-C900-DR14-8in", 4660, 1474},  {"PVC-C900-DR18-8in", 4660, 1292},
                {"PVC-C900-DR25-8in", 4660, 1091},  {"PVC-C900-DR18-12in", 4720, 1311},
                {"PE4710-DR9-8in-IPS", 4660, 1203}, {"PE4710-DR11-8in-IPS", 4660, 1069},
                {"PE4710-DR17-8in-DIPS", 4660, 837}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_pipe_class *p = sure_pipe(c, ROWS[i].id);
        assert_close(speed(c, ROWS[i].id, p->wall_minimum, 300e3 * PSI, ROWS[i].water),
                     ROWS[i].speed, 0.005);
    }
    kent_catalogue_free(c);
}

/* On the mean wall, 6 % above the least: with K D/(E e) = n the speed goes with
 * sqrt((1 + n)/(1 + n')), from 1.030 at DR 51 to 1.038 at DR 7.3 (by hand). */
static void waves_in_plastic_are_a_little_faster_on_the_mean_wall(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    double slowest = INFINITY;
    double fastest = 0.0;
    for (size_t i = 0; i < c->pipe_count; i++) {
        const kent_pipe_class *p = &c->pipes[i];
        if (!kent_catalogue_material(c, p->material)->plastic) continue;
        const double ratio = speed(c, p->id, p->wall, 300e3 * PSI, 4660) /
                             speed(c, p->id, p->wall_minimum, 300e3 * PSI, 4660);
        slowest = fmin(slowest, ratio);
        fastest = fmax(fastest, ratio);
    }
    assert_within(slowest, 1.030, 5e-4);
    assert_within(fastest, 1.038, 5e-4);
    kent_catalogue_free(c);
}

/* ---- all of them ----------------------------------------------------------------- */

static void every_pipe_is_possible_and_says_where_it_comes_from(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    assert_null(kent_catalogue_pipe(c, "DI-EN545-C30-DN300")); /* not made */
    for (size_t i = 0; i < c->pipe_count; i++) {
        const kent_pipe_class *p = &c->pipes[i];
        assert_true(isnan(p->wall_minimum) || p->wall > p->wall_minimum);
        assert_true(isnan(p->wall_minimum) || p->wall_minimum > 0.0);
        assert_true(p->outside_diameter > 2.0 * (p->wall + p->lining));
        assert_true(isnan(p->surge_rating) || p->surge_rating > p->pressure_rating);
        assert_true(isnan(p->test_rating) || p->test_rating > p->surge_rating);
        assert_non_null(kent_catalogue_material(c, p->material));
        assert_true(p->from.source[0] != '\0' && p->from.status[0] != '\0');
        assert_true(p->standard[0] != '\0');
    }
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(ductile_iron_of_en_545_is_that_of_the_standard),
        cmocka_unit_test(walls_of_en_545_follow_from_the_class),
        cmocka_unit_test(special_classes_of_awwa_c151_are_those_of_the_standard),
        cmocka_unit_test(pressure_classes_of_awwa_c151_have_the_published_walls),
        cmocka_unit_test(walls_of_pressure_classes_follow_the_formula_of_awwa_c150),
        cmocka_unit_test(pvc_of_awwa_c900_is_rated_by_its_ratio),
        cmocka_unit_test(pe4710_is_rated_by_its_ratio),
        cmocka_unit_test(pe100_is_rated_by_its_ratio),
        cmocka_unit_test(pvc_u_is_rated_by_its_ratio),
        cmocka_unit_test(walls_of_pe100_are_near_those_of_the_standards_table),
        cmocka_unit_test(steel_has_the_diameters_and_walls_of_its_standards),
        cmocka_unit_test(waves_in_iron_are_as_fast_as_a_published_table_says),
        cmocka_unit_test(waves_in_plastic_are_as_fast_as_the_handbooks_say),
        cmocka_unit_test(waves_in_plastic_are_a_little_faster_on_the_mean_wall),
        cmocka_unit_test(every_pipe_is_possible_and_says_where_it_comes_from),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
