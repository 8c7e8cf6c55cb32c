/* The command line: GNU conventions, by argp. */
#ifndef KENT_OPTIONS_H
#define KENT_OPTIONS_H

#include "kent_report.h"

#include <stdbool.h>
#include <stddef.h>

/* What the program ends with. */
typedef enum kent_exit {
    KENT_EXIT_DONE = 0,
    KENT_EXIT_FAILED = 1, /* could not be done; nothing half-written is left */
    KENT_EXIT_INPUT = 2,  /* bad input or usage; nothing was written */
    KENT_EXIT_LIMIT = 3   /* done, but --strict and a limit is exceeded */
} kent_exit;

typedef enum kent_command {
    KENT_RUN,
    KENT_CHECK,
    KENT_EXPLAIN,
    KENT_CROSS_CHECK,
    KENT_AS_BUILT,
    KENT_STANDARD_TABLE,
    KENT_CATALOGUE_LIST
} kent_command;

typedef enum kent_format {
    KENT_TABLE_FORMAT,
    KENT_CSV_FORMAT,
    KENT_JSON_FORMAT
} kent_format;

enum { KENT_OPTIONS_WORDS = 8 }; /* after the subject, at most */

/* Texts are borrowed from argv. */
typedef struct kent_options {
    kent_command command;
    const char *subject; /* the case, "-" for standard input; what to list; NULL */
    const char *words[KENT_OPTIONS_WORDS]; /* [word_count] after it: what rows of the
                                              catalogue must have; fittings */
    size_t word_count;
    const char *out;        /* folder; NULL: by the case's name */
    const char **scenarios; /* [scenario_count], ours */
    size_t scenario_count, scenario_capacity;
    bool units_given;
    kent_system units;
    unsigned threads; /* 0: as many as there are processors */
    kent_format format;
    bool wide, quiet, strict, no_files, sensitivity;
    kent_sort sort;
    kent_only only;
    bool keys; /* check: the key table, no case */
} kent_options;

/* Reads the command line; o must be all zero. Does not return on --help, --version
 * (status 0) and on usage errors (KENT_EXIT_INPUT). Returns 0, or -1: no memory. */
int kent_options_read(int argc, char **argv, kent_options *o);
void kent_options_clear(kent_options *o);

/* The nearest of some words to a misspelt one, near enough to be meant; NULL: none. */
const char *kent_options_nearest(const char *word, const char *const *words,
                                 size_t count);

#endif
