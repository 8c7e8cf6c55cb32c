/* One invariant of a span, in cells along the way it travels: 17.3 .. 17.6.
 *
 * u' = -(a/dx) (value at the far face - value at the near face). Values at faces lean
 * on three cells, second order in space, and limited where the cells jump. */
#ifndef KENT_STRAND_INTERNAL_H
#define KENT_STRAND_INTERNAL_H

#include <stddef.h>

enum { KENT_STRAND_CELLS = 3 }; /* least number of cells */

typedef struct kent_strand {
    size_t first;     /* index of the first cell it comes to, in the unknowns */
    ptrdiff_t stride; /* to the next one */
    size_t count;     /* cells, at least KENT_STRAND_CELLS */
} kent_strand;

/* m, and its derivatives with respect to three values in order of travel. */
typedef struct kent_face {
    double value, by[3];
} kent_face;

static inline size_t kent_strand_at(const kent_strand *s, size_t cell)
{
    return (size_t)((ptrdiff_t)s->first + (ptrdiff_t)cell * s->stride);
}

/* The face behind cell `cell` (not the last) from y, the unknowns, and what comes in
 * (m). by: the cell before (for cell 0 what comes in), the cell, the one after. */
kent_face kent_strand_face(const kent_strand *s, const double *y, double in,
                           size_t cell);
/* What leaves at the end. by: the last cell but two, the last but one, the last. */
kent_face kent_strand_out(const kent_strand *s, const double *y);

#endif
