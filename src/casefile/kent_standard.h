/* A standard table: sizes x fittings x soils at one pressure, as a utility's standard
 * detail has it. Every cell of it is a case of its own, with one such fitting in a main
 * of that size: what sizes a case sizes a table. */
#ifndef KENT_STANDARD_H
#define KENT_STANDARD_H

#include "kent_catalogue.h"

enum { KENT_STANDARD_SIZES = 40, KENT_STANDARD_FITTINGS = 12, KENT_STANDARD_SOILS = 8 };

/* What is worked out; in the order of the key's words. */
typedef enum kent_standard_what {
    KENT_STANDARD_BLOCKS,
    KENT_STANDARD_JOINTS,
    KENT_STANDARD_BOTH
} kent_standard_what;

typedef struct kent_standard {
    char (*sizes)[KENT_ID];    /* [size_count] names, as the file has them */
    char (*fittings)[KENT_ID]; /* [fitting_count] as the file has them */
    char (*soils)[KENT_ID];    /* [soil_count] ids */
    size_t size_count, fitting_count, soil_count;
    double pressure; /* Pa gauge, at every fitting */
    double factor;   /* asked on the thrust */
    kent_standard_what what;
    /* [soil_count][size_count][fitting_count] cases; the fitting stands at the point
     * KENT_STANDARD_POINT, in still water under `pressure` */
    kent_model **cells;
} kent_standard;

#define KENT_STANDARD_POINT "fitting"

/* Reads the table at path ("-": standard input), like kent_case_read. *out is the
 * caller's. */
kent_status kent_standard_read(const char *path, const kent_catalogue *catalogue,
                               const kent_system *shown, kent_standard **out,
                               kent_complaints *complaints, kent_error *err);
void kent_standard_free(kent_standard *s);

/* Index into cells. */
size_t kent_standard_cell_index(const kent_standard *s, size_t soil, size_t size,
                                size_t fitting);

#endif
