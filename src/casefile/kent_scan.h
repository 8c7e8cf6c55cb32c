/* The text of a case before it is parsed: files joined at their @include lines, with a
 * map back to file and line, and everything refused that libconfig would crash on, read
 * wrongly or name only "syntax error". */
#ifndef KENT_SCAN_H
#define KENT_SCAN_H

#include "kent_files.h"

typedef struct kent_scan {
    char *text; /* NUL-terminated, lines end in '\n' */
    size_t length, text_capacity;
    kent_place *lines; /* [line_count] where each line of text came from */
    size_t line_count, line_capacity;
} kent_scan;

/* kent_scan s = {0}; is a valid, empty one. path "-": standard input. Names of what it
 * reads go into files, an empty one before. Fails with KENT_E_IO (err), KENT_E_NOMEM
 * (err) or KENT_E_INPUT (complaints were added). */
kent_status kent_scan_read(const char *path, kent_files *files, kent_scan *out,
                           kent_complaints *complaints, kent_error *err);
void kent_scan_clear(kent_scan *s);

#endif
