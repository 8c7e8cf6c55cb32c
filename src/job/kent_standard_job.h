/* A standard table worked out: every cell a whole job of its own. */
#ifndef KENT_STANDARD_JOB_H
#define KENT_STANDARD_JOB_H

#include "kent_job.h"
#include "kent_standard.h"

typedef struct kent_standard_cell_result {
    const kent_model *model; /* of the table */
    int fitting;             /* index into it */
    double thrust;           /* N, unfactored, of the governing case; NAN: none */
    bool sized;              /* a block holds it, where one was asked for */
    bool has_length;         /* and every leg that is to be held has a length */
    bool over_rating;        /* the pressure is above what the pipe is rated for */
    double rating;           /* Pa, of the pipe in service; NAN: not known */
    kent_holding holding;    /* its notes are owned; no derivation */
} kent_standard_cell_result;

typedef struct kent_standard_result {
    const kent_standard *table;       /* the caller's; must outlive this */
    kent_standard_cell_result *cells; /* [as many, and in the order, as table->cells] */
    size_t cell_count;
    size_t not_sized; /* cells that lack what was asked for: --strict */
} kent_standard_result;

kent_status kent_standard_work_out(const kent_standard *table, unsigned threads,
                                   kent_standard_result **out, kent_error *err);
void kent_standard_result_free(kent_standard_result *r);

#endif
