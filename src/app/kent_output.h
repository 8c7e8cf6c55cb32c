/* Where a run's results go: standard output and the folder of results. */
#ifndef KENT_OUTPUT_H
#define KENT_OUTPUT_H

#include "kent_options.h"
#include "kent_report.h"

/* A sink that gathers text in memory: what is printed is printed whole or not at all.
 */
kent_sink kent_output_gather(kent_text *text);

/* Writes text to standard output and flushes it. KENT_E_IO where it was not all taken:
 * disk full, closed pipe. */
kent_status kent_output_print(const kent_text *text, kent_error *err);

/* Where the results of a case go by default, "main-results"; NULL: no memory. The
 * caller frees it. */
char *kent_output_folder_name(const char *case_path);

/* Fills a folder beside its final place with summary.csv, results.json and a history
 * and a profile of each scenario; kent_folder_commit puts it there. */
kent_status kent_output_fill(const kent_results *r, const kent_report_options *o,
                             kent_folder *folder, kent_error *err);

/* The file whose presence makes a folder ours to replace. */
extern const char KENT_OUTPUT_MARKER[];

#endif
