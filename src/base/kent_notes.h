/* A list of sentences: cautions, assumptions. kent_notes n = {0}; is a valid, empty
 * one. */
#ifndef KENT_NOTES_H
#define KENT_NOTES_H

#include <stdbool.h>
#include <stddef.h>

typedef struct kent_notes {
    char **text; /* [count] */
    bool *grave; /* [count] whether something is unsafe as it stands */
    size_t count, capacity, grave_capacity;
    size_t *slots; /* [slot_count] index + 1 by hash of the text; 0: free */
    size_t slot_count;
    bool failed; /* a note was lost for want of memory */
} kent_notes;

/* Adds a sentence; one that stands there already is not added again. */
__attribute__((format(printf, 2, 3))) void kent_notes_add(kent_notes *n,
                                                          const char *fmt, ...);

/* The same of what is unsafe as it stands, and is to be read first. */
__attribute__((format(printf, 2, 3))) void kent_notes_warn(kent_notes *n,
                                                           const char *fmt, ...);
void kent_notes_clear(kent_notes *n);

#endif
