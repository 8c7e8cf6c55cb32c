/* Inside report/ only: text in aligned columns, measured in terminal columns and not in
 * bytes, and paragraphs under it. Control characters of an id or a title are shown as
 * '?', so that nothing in a case can break a line. */
#ifndef KENT_TABLE_H
#define KENT_TABLE_H

#include "kent_text.h"

enum { KENT_TABLE_LIMIT = 100 }; /* columns of a printed line unless asked for wide */

/* What to print under a table of which kent_table_print says that it cut something. */
#define KENT_TABLE_CUT "Names that end in … are whole with --wide."

typedef enum kent_align { KENT_ALIGN_LEFT, KENT_ALIGN_RIGHT } kent_align;

typedef struct kent_column {
    const char *head; /* borrowed; must outlive the table */
    const char *unit; /* second heading line; "": none */
    kent_align align;
    bool elastic; /* may be cut short, with an ellipsis, where the line is too long */
} kent_column;

/* kent_table t = {.columns = ..., .column_count = n}; is a valid, empty table. */
typedef struct kent_table {
    const kent_column *columns; /* [column_count], borrowed */
    size_t column_count;
    char **cells; /* [cell_count], row after row */
    size_t cell_count, capacity;
    bool failed; /* a cell was lost for want of memory */
} kent_table;

/* The next cell, left to right, row after row. Blanks at its end count as columns:
 * they keep numbers in line with marked ones. */
__attribute__((format(printf, 2, 3))) void kent_table_cell(kent_table *t,
                                                           const char *fmt, ...);

/* Columns that the longest line takes with two blanks between columns. */
size_t kent_table_width(const kent_table *t);

/* Prints headings and rows. limit: most columns of a line, 0 for none; where it does
 * not suffice, columns move closer, then elastic ones are cut, the widest first.
 * Returns whether anything was cut. */
bool kent_table_print(const kent_table *t, size_t limit, kent_text *out);
void kent_table_clear(kent_table *t);

/* A paragraph behind a lead ("a  "), broken at blanks but not behind a number, whose
 * unit would be lost; later lines indented by the lead. limit 0: one line. */
void kent_table_paragraph(kent_text *out, size_t limit, const char *lead,
                          const char *words);

#endif
