/* The files a case is made of: each read whole, as UTF-8 text, and remembered by name
 * and in one checksum. kent_files f = {0}; is a valid, empty one. */
#ifndef KENT_FILES_H
#define KENT_FILES_H

#include "kent_model.h"

typedef struct kent_files {
    char **names; /* [count] as they are shown to people */
    size_t count, capacity;
    size_t total;                /* bytes of all of them */
    unsigned long long checksum; /* FNV-1a of all bytes read, in order */
    char *folder;                /* of the first one: "", or ending in '/' */
} kent_files;

/* One file's text: NUL-terminated, lines end in '\n'. The caller frees bytes. */
typedef struct kent_file_bytes {
    char *bytes;
    size_t size;
    int file; /* index among the names */
} kent_file_bytes;

/* Reads the case file itself; path "-": standard input, whose folder is the working
 * folder. Fails with KENT_E_IO (err), KENT_E_NOMEM (err) or KENT_E_INPUT (a complaint
 * was added): a file that is too large, no UTF-8, or starts with a byte-order mark. */
kent_status kent_files_start(kent_files *f, const char *path, kent_file_bytes *out,
                             kent_complaints *complaints, kent_error *err);

/* Reads a further file of the same folder, or of one below it. says: how it was named,
 * '@include "a.inc"', and at where: both for complaints. marked: it may start with a
 * byte-order mark, which is skipped. A file that cannot be had is KENT_E_INPUT too. */
kent_status kent_files_beside(kent_files *f, const char *name, const char *says,
                              kent_place at, bool marked, kent_file_bytes *out,
                              kent_complaints *complaints, kent_error *err);

void kent_files_clear(kent_files *f);

#endif
