/* Which nodes water can pass between: the connected parts of a network. */
#ifndef KENT_PARTS_H
#define KENT_PARTS_H

#include "kent_model.h"

#include <stdbool.h>

/* part: [node_count], written: nodes of one part carry the same number, that of one of
 * them. passes: [valve_count] which in-line valves join their two sides; NULL: all.
 * Pumps, check and control valves always do. */
void kent_parts_find(const kent_model *m, const bool *passes, int *part);

/* The node that stands for n's part; puts two nodes into one part. part[n] is n to
 * start with. */
int kent_parts_root(int *part, int n);
void kent_parts_join(int *part, int a, int b);

#endif
