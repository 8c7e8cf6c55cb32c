/* The cells of a table in CSV (RFC 4180), read by libcsv, which is known here alone. */
#ifndef KENT_CSV_H
#define KENT_CSV_H

#include "kent_files.h"

typedef struct kent_csv_row {
    int line;            /* where it starts */
    size_t first, count; /* among the cells */
} kent_csv_row;

/* kent_csv c = {0}; is a valid, empty one. */
typedef struct kent_csv {
    kent_csv_row *rows; /* [row_count]; the headings first; none is all empty */
    size_t row_count, row_capacity;
    char **cells; /* [cell_count] without the spaces around them; "": empty */
    size_t cell_count, cell_capacity;
    char *texts; /* what the cells point into */
    size_t text_size;
} kent_csv;

/* Fails with KENT_E_NOMEM (err) or, after a complaint, KENT_E_INPUT: a quote in the
 * wrong place or never closed. */
kent_status kent_csv_read(const kent_file_bytes *source, const char *name,
                          char separator, kent_csv *out, kent_complaints *complaints,
                          kent_error *err);
void kent_csv_clear(kent_csv *c);

#endif
