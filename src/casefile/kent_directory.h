/* Ids of one group of things and where they stand in their array. */
#ifndef KENT_DIRECTORY_H
#define KENT_DIRECTORY_H

#include "kent_model.h"

typedef struct kent_entry {
    const char *id; /* borrowed: of the tree or the catalogue, which outlive it */
    int index;
    kent_place place;
} kent_entry;

typedef struct kent_directory {
    kent_entry *entries; /* [count] sorted by id once kent_directory_sort was called */
    size_t count, capacity;
} kent_directory;

/* kent_directory d = {0}; is a valid, empty one. Returns 0, or -1: no memory. */
int kent_directory_add(kent_directory *d, const char *id, int index, kent_place place);
void kent_directory_sort(kent_directory *d); /* equal ids in order of index */
int kent_directory_find(const kent_directory *d, const char *id); /* -1 */

/* The id nearest to a misspelt one; NULL: none is near. */
const char *kent_directory_nearest(const kent_directory *d, const char *id);
void kent_directory_clear(kent_directory *d);

#endif
