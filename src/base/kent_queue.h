/* Jobs 0 .. count-1, taken in order by up to `threads` threads. A job writes only to
 * its own slot, so results do not depend on who took it. */
#ifndef KENT_QUEUE_H
#define KENT_QUEUE_H

#include <stddef.h>

typedef void kent_queue_job(void *context, size_t index);

/* Runs every job; returns when all are done. threads <= 1, or where no thread can be
 * started: in this one. */
void kent_queue_run(size_t count, unsigned threads, kent_queue_job *job, void *context);

#endif
