/* What a block takes to build: concrete, excavation, formwork. Plain functions of
 * numbers, m. */
#ifndef KENT_QUANTITY_H
#define KENT_QUANTITY_H

#include "kent_plain_concrete.h"

typedef struct kent_quantities {
    double concrete;   /* m3, what the pipe takes of it not taken off */
    double excavation; /* m3, from the ground to the block's base; NAN: no cover is
                          stated */
    double formed;     /* m2 of sides that are not cast against the ground */
} kent_quantities;

/* A block behind a face, its pipe's axis at a depth below ground in the middle of the
 * face. through: the pipe passes through it, and both faces are cast against the
 * ground. source docs/theory 19.25 .. 19.27 */
kent_quantities kent_quantity_face(kent_face face, double thickness, double axis,
                                   bool through);

/* A block of that plan and height whose base lies at a depth below ground. source
 * 19.25, 19.26, 19.28 */
kent_quantities kent_quantity_body(kent_face plan, double height, double base);

kent_quantities kent_quantity_sum(kent_quantities a, kent_quantities b);

#endif
