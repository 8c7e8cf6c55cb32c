#include "kent_directory.h"

#include <stdint.h>
#include <stdlib.h>
#include <string.h>

int kent_directory_add(kent_directory *d, const char *id, int index, kent_place place)
{
    if (kent_grow((void **)&d->entries, &d->capacity, d->count + 1,
                  sizeof *d->entries) != 0) {
        return -1;
    }
    d->entries[d->count++] = (kent_entry){id, index, place};
    return 0;
}

static int by_id(const void *a, const void *b)
{
    const kent_entry *x = a;
    const kent_entry *y = b;
    const int order = strcmp(x->id, y->id);
    return order != 0 ? order : (x->index > y->index) - (x->index < y->index);
}

void kent_directory_sort(kent_directory *d)
{
    if (d->count > 1) qsort(d->entries, d->count, sizeof *d->entries, by_id);
}

int kent_directory_find(const kent_directory *d, const char *id)
{
    size_t low = 0;
    size_t high = d->count;
    while (low < high) { /* the first entry not before id */
        const size_t middle = low + (high - low) / 2;
        if (strcmp(d->entries[middle].id, id) < 0) {
            low = middle + 1;
        } else {
            high = middle;
        }
    }
    return low < d->count && strcmp(d->entries[low].id, id) == 0 ? d->entries[low].index
                                                                 : -1;
}

const char *kent_directory_nearest(const kent_directory *d, const char *id)
{
    const char *best = NULL;
    size_t least = SIZE_MAX;
    for (size_t i = 0; i < d->count; i++) {
        const size_t distance = kent_text_misspelling(d->entries[i].id, id);
        if (distance < least) {
            least = distance;
            best = d->entries[i].id;
        }
    }
    return best;
}

void kent_directory_clear(kent_directory *d)
{
    free(d->entries);
    *d = (kent_directory){0};
}
