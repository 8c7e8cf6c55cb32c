/* Memory. Everything is calloc'd, so all-zero is what a new object starts from, and
 * every size is checked against overflow. Free with free(). */
#ifndef KENT_ALLOC_H
#define KENT_ALLOC_H

#include <stddef.h>

/* [count] objects of size bytes, zeroed; count 0 gives one byte. NULL: no memory. */
void *kent_alloc(size_t count, size_t size);

/* Makes room for at least need objects in *array (capacity doubles; new room is
 * zeroed). Returns 0, or -1 and leaves *array and *capacity as they were. */
int kent_grow(void **array, size_t *capacity, size_t need, size_t size);

/* A copy of text; NULL: no memory. */
char *kent_copy_text(const char *text);

#endif
