/* Convex figures in plan: what they share, and how far they lie apart. */
#ifndef KENT_CONVEX_H
#define KENT_CONVEX_H

#include <stddef.h>

enum { KENT_CORNERS = 12 };

typedef struct kent_convex {
    double x[KENT_CORNERS], y[KENT_CORNERS]; /* m, counter-clockwise */
    size_t count;
} kent_convex;

/* A four-sided figure, square to a line and symmetrical about it: from its near end
 * (m along the unit vector ux, uy from x, y), half so wide there, to its far end, half
 * so wide. near < far. */
typedef struct kent_taper {
    double x, y, ux, uy;
    double near, far;           /* m */
    double near_half, far_half; /* m */
} kent_taper;

kent_convex kent_convex_taper(const kent_taper *t);

double kent_convex_area(const kent_convex *c); /* m2 */

/* m2 that two figures of four sides share. fails never. */
double kent_convex_shared(const kent_convex *a, const kent_convex *b);

/* m between two figures; 0 where they meet. */
double kent_convex_gap(const kent_convex *a, const kent_convex *b);

#endif
