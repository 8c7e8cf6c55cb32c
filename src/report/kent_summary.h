/* Inside report/ only: one row per fitting, every column once. summary.csv and the last
 * tables of --wide walk the same list of columns. */
#ifndef KENT_SUMMARY_H
#define KENT_SUMMARY_H

#include "kent_listing.h"

/* The columns that the narrow table does not have and that any fitting has something
 * in, as aligned tables of what belongs together. */
void kent_summary_table(const kent_results *r, const kent_report_options *o,
                        const kent_listing *listing, kent_text *out);

/* What moves as one thing at a time does: r->sensitivity, which must be there. */
void kent_sensitivity_table(const kent_results *r, const kent_report_options *o,
                            kent_text *out);

/* A field of RFC 4180: quoted where it holds a comma, a quote or a line break. */
void kent_summary_field(kent_text *out, const char *text);

#endif
