/* What the tests of the marcher share: a case marched in one call. */
#ifndef MARCH_H
#define MARCH_H

#include "kent_build.h"
#include "kent_check.h"
#include "kent_surge.h"

typedef struct march {
    kent_build *build;
    kent_steady *steady;
    kent_grid *grid;
    kent_marcher *marcher;
} march;

/* Derives b, solves, plans for `duration` s, and makes a marcher; scenario -1: none.
 * Fails the test where any of it fails. */
march march_new(kent_build *b, double duration, int scenario, const kent_watch *watches,
                size_t watch_count, size_t block);
/* The same of a model already solved and planned. */
kent_marcher *march_marcher(const march *m, int scenario, const kent_watch *watches,
                            size_t watch_count, size_t block);
/* Frees everything but b. */
void march_clear(march *m);

/* Advances until time (s); head and flow of the first watch then. */
void march_until(march *m, double time, double *head, double *flow);

#endif
