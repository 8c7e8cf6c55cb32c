/* Refuses allocations one after the other. A test links kent_alloc_fail, which wraps
 * calloc in everything linked statically into it (-Wl,--wrap=calloc). */
#ifndef KENT_ALLOC_FAIL_H
#define KENT_ALLOC_FAIL_H

#include <stddef.h>

/* A whole job that leaves nothing behind: 0 done, else it failed for want of memory. A
 * failure of any other kind must fail the test from within. */
typedef int kent_alloc_task(void *context);

/* Runs task with 0, 1, 2, ... allocations granted until it completes. Returns the
 * smallest number with which it did; -1 where 100 000 were not enough. */
long kent_allocations_needed(kent_alloc_task *task, void *context);

/* The same by hand: grants count allocations from now on, -1 all. */
void kent_allocations_grant(long count);

#endif
