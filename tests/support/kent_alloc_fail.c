#include "kent_alloc_fail.h"

/* The linker wants these names. */
void *__real_calloc(size_t count, size_t size); /* NOLINT */
void *__wrap_calloc(size_t count, size_t size); /* NOLINT */

static long granted = -1; /* allocations still granted; -1: all */

void *__wrap_calloc(size_t count, size_t size) /* NOLINT */
{
    if (granted == 0) return NULL;
    if (granted > 0) granted--;
    return __real_calloc(count, size);
}

void kent_allocations_grant(long count) { granted = count; }

long kent_allocations_needed(kent_alloc_task *task, void *context)
{
    for (long count = 0; count < 100000; count++) {
        granted = count;
        const int failed = task(context);
        granted = -1;
        if (!failed) return count;
    }
    return -1;
}
