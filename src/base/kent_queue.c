#include "kent_queue.h"

#include "kent_alloc.h"

#include <pthread.h>
#include <stdatomic.h>
#include <stdlib.h>

typedef struct work {
    size_t count;
    atomic_size_t next; /* first job nobody has taken yet */
    kent_queue_job *job;
    void *context;
} work;

static void *take_jobs(void *argument)
{
    work *w = argument;
    for (;;) {
        const size_t index = atomic_fetch_add(&w->next, 1);
        if (index >= w->count) return NULL;
        w->job(w->context, index);
    }
}

void kent_queue_run(size_t count, unsigned threads, kent_queue_job *job, void *context)
{
    work w = {.count = count, .job = job, .context = context};
    /* This thread works too, so one helper fewer; never more threads than jobs. */
    size_t helpers = threads > 1 ? threads - 1 : 0;
    if (helpers >= count) helpers = count > 0 ? count - 1 : 0;
    pthread_t *helper = helpers > 0 ? kent_alloc(helpers, sizeof *helper) : NULL;
    size_t started = 0;

    atomic_init(&w.next, 0);
    if (helper) {
        while (started < helpers &&
               pthread_create(&helper[started], NULL, take_jobs, &w) == 0) {
            started++;
        }
    }
    (void)take_jobs(&w);
    for (size_t i = 0; i < started; i++) {
        (void)pthread_join(helper[i], NULL);
    }
    free(helper);
}
