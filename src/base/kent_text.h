/* Growing text. kent_text t = {0}; is a valid, empty one. A failed allocation is
 * remembered (failed), so that only the last line of a writer needs a check. */
#ifndef KENT_TEXT_H
#define KENT_TEXT_H

#include <stdbool.h>
#include <stddef.h>

typedef struct kent_text {
    char *s; /* NUL-terminated once anything was added, else NULL */
    size_t length, capacity;
    bool failed;
} kent_text;

__attribute__((format(printf, 2, 3))) void kent_text_add(kent_text *t, const char *fmt,
                                                         ...);
const char *kent_text_of(const kent_text *t); /* "" when empty; lives as long as t */
void kent_text_reset(kent_text *t);
void kent_text_clear(kent_text *t);

/* Bytes of the UTF-8 sequence at the start of a text, 1 to 4; 0: it is none. */
size_t kent_text_sequence(const char *utf8);

/* Columns a UTF-8 text fills on a terminal: code points, combining marks not counted.
 */
size_t kent_text_columns(const char *utf8);

/* Length of a decimal number at the start of text, 0: none. No hexadecimal, no nan. */
size_t kent_text_number(const char *text);

/* Smallest number of single-letter edits that turns a into b (for "did you mean"). */
size_t kent_text_distance(const char *a, const char *b);

/* The edits that turn a misspelt word into a known one, none where only capitals
 * differ; SIZE_MAX: so many that it is another word. */
size_t kent_text_misspelling(const char *known, const char *word);

#endif
