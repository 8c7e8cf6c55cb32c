/* Inside report/ only: what a standard table holds for, in words, and its cells. */
#ifndef KENT_STANDARD_TOLD_H
#define KENT_STANDARD_TOLD_H

#include "kent_report.h"

/* Every assumption that the table stands on, one sentence each; the last says what it
 * is not for. */
void kent_standard_assumptions(const kent_standard_result *r, kent_system units,
                               kent_notes *out);

/* Why a cell has no block, or no restrained length; NULL: it has. */
const char *kent_standard_no_block(const kent_standard_cell_result *c);
const char *kent_standard_no_length(const kent_standard_cell_result *c);

/* "bend 45°" of "bend 45 deg". */
kent_name kent_standard_fitting_name(const kent_standard *t, size_t fitting);

#endif
