/* What a step takes out of the water that a span holds (7.20), reckoned from its heads
 * and flows alone. At a grid point what friction takes from one wave it gives to the
 * other; but at a span's ends, and beside a cavity, only one of both is there
 * (7.24). A wall that creeps keeps what it takes (16.23). */
#ifndef TOLL_H
#define TOLL_H

#include "kent_marcher.h"

typedef struct toll toll;

/* Of one span, at rest as s has it. NULL: out of memory. */
toll *toll_new(const kent_model *m, const kent_steady *s, const kent_grid *grid,
               size_t span);
void toll_free(toll *t);

/* m3 of the step that follows an instant; every instant must be told, in turn. head m,
 * flow m3/s (the mean of both sides), parted m3/s (that after less that before, nil
 * without a cavity): [reaches + 1]. *rough: m3, the sizes of what the law of friction
 * went into. */
double toll_take(toll *t, const double *head, const double *flow, const double *parted,
                 double *rough);

#endif
