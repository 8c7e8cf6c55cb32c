/* Everything wrong with an input, in one go. kent_complaints c = {0}; is a valid, empty
 * list; the first KENT_COMPLAINTS_KEPT are kept, all are counted. */
#ifndef KENT_COMPLAINTS_H
#define KENT_COMPLAINTS_H

#include <stddef.h>

enum { KENT_COMPLAINTS_KEPT = 20 };

typedef struct kent_complaint {
    char file[256];
    int line;       /* 0: the file as a whole */
    char what[480]; /* "what is wrong; what would be right" */
} kent_complaint;

typedef struct kent_complaints {
    kent_complaint kept[KENT_COMPLAINTS_KEPT];
    size_t count; /* all of them; may exceed KENT_COMPLAINTS_KEPT */
} kent_complaints;

__attribute__((format(printf, 4, 5))) void
kent_complain(kent_complaints *c, const char *file, int line, const char *fmt, ...);
/* Puts the kept ones in order of file (as first met) and line; equal lines keep order.
 */
void kent_complaints_sort(kent_complaints *c);

#endif
