/* Every case against everything that is asked of it: results' limits. */
#ifndef KENT_LIMIT_TABLE_H
#define KENT_LIMIT_TABLE_H

#include "kent_job.h"

/* Fills limits and limit_count, and sets limit_exceeded. Loads must be there. */
kent_status kent_limit_table_fill(kent_results *r, kent_error *err);

/* Pa: what a row may still rise or fall before it is at its limit; NAN: nobody asks. */
double kent_limit_margin(const kent_limit *l);

/* As in results: "pipe", "joints", "fitting", "lowest", "vapour", "collapse". */
const char *kent_limit_word(kent_limit_kind kind);

#endif
