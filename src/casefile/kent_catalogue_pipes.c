/* Pipes of a standard: one per size and class. */
#include "kent_catalogue_internal.h"

#include <math.h>
#include <stdio.h>

enum { CLASSES_MOST = 16, TOLERANCES_MOST = 8 };

/* Where the wall of a class comes from; NAN: from the row of each size. */
typedef struct pipe_column {
    char id[KENT_ID];
    double pressure_rating;       /* Pa; NAN */
    double diameter_ratio;        /* outside diameter over wall */
    double wall;                  /* m, one for every size */
    double least_size, most_size; /* in the table's unit, made from .. to */
    bool in_rows;                 /* neither ratio nor wall: the rows have it */
} pipe_column;

typedef struct standard {
    kent_pipe_class common; /* what all its pipes share */
    char id[KENT_ID], before[16], after[16];
    double unit;            /* m */
    bool walls_are_minimum; /* else nominal */
    /* nominal less minimum wall, added up */
    double tolerance;                     /* m */
    double per_size;                      /* of the size in its unit */
    double per_wall;                      /* of the wall given */
    double tolerance_to[TOLERANCES_MOST]; /* size, rising ... */
    double tolerance_of[TOLERANCES_MOST]; /* ... up to which it is so many units */
    size_t tolerance_count;
    bool has_tolerance;
    double surge_factor, recurring_factor; /* NAN */
    double surge_addition, test_addition;  /* Pa; NAN */
    pipe_column columns[CLASSES_MOST];     /* [class_count] */
    size_t class_count, walls_in_rows;
} standard;

static void read_column(kent_reader *r, const kent_twig *twig, size_t index,
                        const char *label, pipe_column *c)
{
    kent_record column;
    kent_record_read(r, twig, "pipe_column", label, index + 1, &column);
    kent_record_copy(&column, "id", NULL, c->id, sizeof c->id);
    c->pressure_rating = kent_record_number(&column, "pressure_rating");
    c->diameter_ratio = kent_record_number(&column, "diameter_ratio");
    c->wall = kent_record_number(&column, "wall");
    c->least_size = kent_record_number_or(&column, "least_size", 0.0);
    c->most_size = kent_record_number_or(&column, "most_size", INFINITY);
    c->in_rows = isnan(c->diameter_ratio) && isnan(c->wall);
    if (column.sound && !isnan(c->diameter_ratio) && !isnan(c->wall)) {
        kent_record_complain(r, &column, "wall",
                             "diameter_ratio and wall are both given; keep one");
    }
}

static void read_classes(kent_reader *r, kent_record *record, standard *s)
{
    const kent_twig *list = kent_record_field(record, "classes")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    if (count > CLASSES_MOST) {
        kent_record_complain(r, record, "classes", "more than %d classes",
                             CLASSES_MOST);
        return;
    }
    for (size_t i = 0; i < count; i++) {
        const kent_twig *twig = kent_record_element(r, list, record->label, i);
        if (!twig) return;
        read_column(r, twig, i, record->label, &s->columns[i]);
        if (s->columns[i].in_rows) s->walls_in_rows++;
    }
    s->class_count = count;
}

static void read_tolerances(kent_reader *r, kent_record *record, standard *s)
{
    s->tolerance = kent_record_number_or(record, "tolerance", 0.0);
    s->per_size = kent_record_number_or(record, "tolerance_per_size", 0.0);
    s->per_wall = kent_record_number_or(record, "tolerance_per_wall", 0.0);
    if (kent_record_has(record, "tolerances")) {
        s->tolerance_count =
            kent_record_pairs(r, record, "tolerances", KENT_RATIO, KENT_RATIO,
                              TOLERANCES_MOST, s->tolerance_to, s->tolerance_of);
    }
    for (size_t i = 1; i < s->tolerance_count; i++) {
        if (s->tolerance_to[i] > s->tolerance_to[i - 1]) continue;
        kent_record_complain(r, record, "tolerances",
                             "pair %zu of tolerances: sizes must rise", i + 1);
    }
    s->has_tolerance =
        kent_record_has(record, "tolerance") || s->per_size > 0.0 || s->per_wall > 0.0;
}

/* Nominal less minimum wall, m; NAN: not known. */
static double tolerance_of(const standard *s, double size, double wall)
{
    const double same =
        s->tolerance + s->per_size * size * s->unit + s->per_wall * wall;
    for (size_t i = 0; i < s->tolerance_count; i++) {
        if (size <= s->tolerance_to[i]) return same + s->tolerance_of[i] * s->unit;
    }
    return s->has_tolerance ? same : (double)NAN;
}

static void set_walls(const standard *s, double size, double wall, kent_pipe_class *p)
{
    const double tolerance = tolerance_of(s, size, wall);
    if (!s->walls_are_minimum) {
        p->wall = wall;
        p->wall_minimum = wall - tolerance;
    } else {
        p->wall = isnan(tolerance) ? wall : wall + tolerance;
        p->wall_minimum = wall;
    }
}

static void set_ratings(const standard *s, const pipe_column *c, kent_pipe_class *p)
{
    const bool surge = !isnan(s->surge_factor) || !isnan(s->surge_addition);
    const double factor = isnan(s->surge_factor) ? 1.0 : s->surge_factor;
    const double addition = isnan(s->surge_addition) ? 0.0 : s->surge_addition;
    p->pressure_rating = c->pressure_rating;
    p->surge_rating = surge ? factor * p->pressure_rating + addition : (double)NAN;
    p->recurring_rating = s->recurring_factor * p->pressure_rating;
    p->test_rating = p->surge_rating + s->test_addition;
}

/* row: size, outside diameter, lining. false: its id would be cut short. */
static bool add_pipe(kent_reader *r, const standard *s, const double *row,
                     const pipe_column *column, double wall, kent_catalogue *c)
{
    kent_pipe_class *p =
        kent_catalogue_grown(r, (void **)&c->pipes, &c->pipe_count, sizeof *p);
    if (!p) return true; /* the reader knows */
    *p = s->common;
    const int length = snprintf(p->id, sizeof p->id, "%s-%s-%s%g%s", s->id, column->id,
                                s->before, row[0], s->after);
    if (length >= (int)sizeof p->id) {
        c->pipe_count--;
        return false;
    }
    p->nominal_size = row[0] * s->unit;
    p->outside_diameter = row[1] * s->unit;
    p->lining = row[2] * s->unit;
    set_walls(s, row[0], wall, p);
    set_ratings(s, column, p);
    return true;
}

/* Numbers of a row; false after a complaint. */
static bool read_row(kent_reader *r, kent_record *record, size_t index, size_t count,
                     double *row)
{
    const kent_twig *twig =
        kent_twig_child(kent_record_field(record, "rows")->twig, index);
    if (kent_twig_type_of(twig) != KENT_TWIG_LIST || kent_twig_count(twig) != count) {
        kent_record_complain(r, record, "rows", "row %zu must hold %zu numbers",
                             index + 1, count);
        return false;
    }
    for (size_t i = 0; i < count; i++) {
        row[i] = kent_twig_number(kent_twig_child(twig, i));
        if (!(row[i] >= 0.0) || (i < 2 && row[i] == 0.0)) {
            kent_record_complain(r, record, "rows",
                                 "row %zu: number %zu is not positive", index + 1,
                                 i + 1);
            return false;
        }
    }
    return true;
}

static void add_row(kent_reader *r, kent_record *record, const standard *s,
                    size_t index, kent_catalogue *c)
{
    double row[3 + CLASSES_MOST] = {0};
    const double *next = &row[3];
    if (!read_row(r, record, index, 3 + s->walls_in_rows, row)) return;
    for (size_t i = 0; i < s->class_count; i++) {
        const pipe_column *column = &s->columns[i];
        double wall = column->wall;
        if (column->in_rows) wall = *next++ * s->unit;
        if (!isnan(column->diameter_ratio)) {
            wall = row[1] * s->unit / column->diameter_ratio;
        }
        const bool made =
            wall > 0.0 && row[0] >= column->least_size && row[0] <= column->most_size;
        if (made && !add_pipe(r, s, row, column, wall, c)) {
            kent_record_complain(r, record, "rows", "ids of row %zu are too long",
                                 index + 1);
            return;
        }
    }
}

void kent_catalogue_add_standard(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    standard s = {.common.from = kent_record_provenance(record),
                  .surge_factor = kent_record_number(record, "surge_factor"),
                  .surge_addition = kent_record_number(record, "surge_addition"),
                  .recurring_factor = kent_record_number(record, "recurring_factor"),
                  .test_addition = kent_record_number(record, "test_addition")};
    kent_record_copy(record, "id", NULL, s.id, sizeof s.id);
    kent_record_copy(record, "before_size", NULL, s.before, sizeof s.before);
    kent_record_copy(record, "after_size", NULL, s.after, sizeof s.after);
    kent_record_copy(record, "standard", NULL, s.common.standard,
                     sizeof s.common.standard);
    kent_record_copy(record, "material", NULL, s.common.material,
                     sizeof s.common.material);
    s.unit = kent_record_field(record, "unit")->index == 0 ? 0.001 : 0.0254;
    s.walls_are_minimum = kent_record_field(record, "walls")->index == 0;
    read_tolerances(r, record, &s);
    read_classes(r, record, &s);
    const kent_twig *rows = kent_record_field(record, "rows")->twig;
    if (!record->sound || !rows) return;
    for (size_t i = 0; i < kent_twig_count(rows); i++) {
        add_row(r, record, &s, i, c);
    }
}
