/* Pipes of a standard: one per row and class. */
#include "kent_catalogue_internal.h"

#include <math.h>
#include <stdio.h>

/* ---- a standard: one pipe per row and class -------------------------------------- */

enum { CLASSES_MOST = 16 };

typedef struct standard {
    kent_pipe_class common; /* what all its pipes share */
    char id[KENT_ID], before[16], after[16];
    double unit;                    /* m */
    bool walls_are_minimum;         /* else nominal */
    double tolerance, per_size;     /* m; - (of the size in its unit) */
    char classes[CLASSES_MOST][16]; /* [class_count] */
    double ratings[CLASSES_MOST];   /* Pa; NAN */
    size_t class_count;
} standard;

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
        kent_record column;
        const kent_twig *twig = kent_record_element(r, list, record->label, i);
        if (!twig) return;
        kent_record_read(r, twig, "pipe_column", record->label, i + 1, &column);
        kent_record_copy(&column, "id", NULL, s->classes[i], sizeof s->classes[i]);
        s->ratings[i] = kent_record_number(&column, "pressure_rating");
    }
    s->class_count = count;
}

/* false: its id would be cut short. */
static bool add_pipe(kent_reader *r, const standard *s, const double *row,
                     size_t column, kent_catalogue *c)
{
    const double size = row[0];
    const double wall = row[3 + column] * s->unit;
    kent_pipe_class *p =
        kent_catalogue_grown(r, (void **)&c->pipes, &c->pipe_count, sizeof *p);
    if (!p) return true; /* the reader knows */
    *p = s->common;
    const int length = snprintf(p->id, sizeof p->id, "%s-%s-%s%g%s", s->id,
                                s->classes[column], s->before, size, s->after);
    if (length >= (int)sizeof p->id) {
        c->pipe_count--;
        return false;
    }
    p->outside_diameter = row[1] * s->unit;
    p->lining = row[2] * s->unit;
    p->wall_minimum = s->walls_are_minimum ? wall : NAN;
    p->wall = s->walls_are_minimum ? wall + s->tolerance + s->per_size * size * s->unit
                                   : wall;
    p->pressure_rating = s->ratings[column];
    return true;
}

static void add_row(kent_reader *r, kent_record *record, const standard *s,
                    size_t index, kent_catalogue *c)
{
    const kent_twig *twig =
        kent_twig_child(kent_record_field(record, "rows")->twig, index);
    const size_t count = 3 + s->class_count;
    double row[3 + CLASSES_MOST] = {0};
    if (kent_twig_type_of(twig) != KENT_TWIG_LIST || kent_twig_count(twig) != count) {
        kent_record_complain(r, record, "rows", "row %zu must hold %zu numbers",
                             index + 1, count);
        return;
    }
    for (size_t i = 0; i < count; i++) {
        row[i] = kent_twig_number(kent_twig_child(twig, i));
        if (!(row[i] >= 0.0) || (i < 2 && row[i] == 0.0)) {
            kent_record_complain(r, record, "rows",
                                 "row %zu: number %zu is not positive", index + 1,
                                 i + 1);
            return;
        }
    }
    for (size_t i = 0; i < s->class_count; i++) {
        if (row[3 + i] > 0.0 && !add_pipe(r, s, row, i, c)) {
            kent_record_complain(r, record, "rows", "ids of row %zu are too long",
                                 index + 1);
            return;
        }
    }
}

void kent_catalogue_add_standard(kent_reader *r, kent_record *record, kent_catalogue *c)
{
    standard s = {.common.from = kent_record_provenance(record)};
    kent_record_copy(record, "id", NULL, s.id, sizeof s.id);
    kent_record_copy(record, "before_size", NULL, s.before, sizeof s.before);
    kent_record_copy(record, "after_size", NULL, s.after, sizeof s.after);
    kent_record_copy(record, "standard", NULL, s.common.standard,
                     sizeof s.common.standard);
    kent_record_copy(record, "material", NULL, s.common.material,
                     sizeof s.common.material);
    s.unit = kent_record_field(record, "unit")->index == 0 ? 0.001 : 0.0254;
    s.walls_are_minimum = kent_record_field(record, "walls")->index == 0;
    s.tolerance = kent_record_number_or(record, "tolerance", 0.0);
    s.per_size = kent_record_number_or(record, "tolerance_per_size", 0.0);
    read_classes(r, record, &s);
    const kent_twig *rows = kent_record_field(record, "rows")->twig;
    if (!record->sound || !rows) return;
    for (size_t i = 0; i < kent_twig_count(rows); i++) {
        add_row(r, record, &s, i, c);
    }
}
