#include "kent_alloc.h"

#include <stdint.h>
#include <stdlib.h>
#include <string.h>

void *kent_alloc(size_t count, size_t size)
{
    if (size != 0 && count > SIZE_MAX / size) return NULL;
    return count * size == 0 ? calloc(1, 1) : calloc(count, size);
}

int kent_grow(void **array, size_t *capacity, size_t need, size_t size)
{
    if (need <= *capacity) return 0;

    size_t room = *capacity > 0 ? *capacity : 8;
    while (room < need) {
        room = room > SIZE_MAX / 2 ? need : 2 * room;
    }

    /* calloc and copy rather than realloc: new room is zeroed, and one function
     * stands for every allocation (a test refuses them one by one). */
    void *larger = kent_alloc(room, size);
    if (!larger) return -1;
    if (*array) memcpy(larger, *array, *capacity * size);
    free(*array);
    *array = larger;
    *capacity = room;
    return 0;
}

char *kent_copy_text(const char *text)
{
    const size_t size = strlen(text) + 1;
    char *copy = kent_alloc(size, 1);
    if (copy) memcpy(copy, text, size);
    return copy;
}
