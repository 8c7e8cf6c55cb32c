/* A folder that appears whole or not at all. It is filled beside its final place and
 * swapped in by kent_folder_commit; until then the old one, if any, stands untouched.
 * Only a folder that holds a file named marker (our own) is ever replaced. */
#ifndef KENT_FOLDER_H
#define KENT_FOLDER_H

#include "kent_error.h"
#include <stdio.h>

typedef struct kent_folder kent_folder;

/* Fails with KENT_E_IO where path exists and is not a folder holding marker, or cannot
 * be written beside. Repairs what an interrupted swap of an earlier run left. */
kent_status kent_folder_open(const char *path, const char *marker, kent_folder **out,
                             kent_error *err);

/* A new file inside, open for writing; the caller closes it with kent_folder_close.
 * name may hold one '/'-separated subfolder ("plots/a.svg"). NULL: err says why. */
FILE *kent_folder_create(kent_folder *f, const char *name, kent_error *err);

/* Flushes and closes; KENT_E_IO where any write failed (disk full). */
kent_status kent_folder_close(kent_folder *f, FILE *file, const char *name,
                              kent_error *err);

kent_status kent_folder_commit(kent_folder *f, kent_error *err);
void kent_folder_free(kent_folder *f); /* not committed: everything new is removed */

#endif
