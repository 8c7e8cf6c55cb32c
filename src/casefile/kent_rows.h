/* The rows of a table (CSV) as groups that the record reader takes like those of a case
 * file. The headings are the keys of the group, with a unit in brackets, "z [m]", or in
 * a row of units below them; a cell may carry its own unit, an empty cell is a key left
 * out, and a route is ids separated by spaces. */
#ifndef KENT_ROWS_H
#define KENT_ROWS_H

#include "kent_record.h"

typedef struct kent_rows kent_rows; /* its texts live as long as it does */

typedef struct kent_rows_style {
    char separator;     /* between cells */
    bool decimal_comma; /* numbers as 3,5 */
} kent_rows_style;

/* Reads the table `name` of rows of `group`; says and at: how and where the case names
 * it. What is wrong with its headings, its number of cells and the way its numbers are
 * written is complained of here, all at once. Fails with KENT_E_INPUT (complaints were
 * added), KENT_E_IO or KENT_E_NOMEM (err). *out is the caller's. */
kent_status kent_rows_read(kent_reader *r, const char *name, const char *says,
                           kent_place at, const char *group, kent_rows_style style,
                           kent_rows **out, kent_error *err);

size_t kent_rows_count(const kent_rows *rows); /* 0 for NULL */

/* One row; it lives until the next call, its texts as long as the rows. NULL: no
 * memory. */
const kent_twig *kent_rows_group(kent_reader *r, kent_rows *rows, size_t index);
void kent_rows_free(kent_rows *rows);

#endif
