/* The method of characteristics as textbooks print it, to judge and to race the engine.
 *
 * One block of nodes per pipe, head and flow in each, one call per node. Shares with
 * the engine the model, the steady state and the grid, and no line of code.
 * E. B. Wylie and V. L. Streeter, Fluid Transients in Systems, 1993, chapter 3 (from
 * memory). */
#ifndef TEXTBOOK_H
#define TEXTBOOK_H

#include "kent_grid.h"
#include "kent_steady.h"

typedef struct textbook textbook;

/* The scenario's events must be ramps of valves, one for each, that start after t = 0.
 * follow: the friction factor of every node at every step from its own flow; else of
 * the steady state. NULL: no memory. m, s and grid must outlive it. */
textbook *textbook_new(const kent_model *m, const kent_steady *s, const kent_grid *grid,
                       int scenario, bool follow);
void textbook_free(textbook *t);

void textbook_run(textbook *t, size_t steps);

/* Of node i of a span, now, m and m3/s; highest and lowest so far, m. */
double textbook_head(const textbook *t, size_t span, size_t i);
double textbook_flow(const textbook *t, size_t span, size_t i);
double textbook_highest(const textbook *t, size_t span, size_t i);
double textbook_lowest(const textbook *t, size_t span, size_t i);

#endif
