/* The straps or rods that tie a pipe to the block whose weight holds it down: how many
 * legs, how thick, how deep in the concrete. A strap over the pipe, or a U-bolt, has
 * two legs, so that their number is even.
 *
 * source docs/theory/20-stability.md */
#ifndef KENT_STRAPS_H
#define KENT_STRAPS_H

#include "kent_model.h"

typedef struct kent_straps {
    double force; /* N, factored, that they carry upwards; 0: nothing is lifted */
    int legs;     /* an even number; 0: no strap_stress is stated, the force alone is */
    double diameter;  /* m, one of the standard ones; where threaded, at the root */
    double stress;    /* Pa, reached */
    double anchorage; /* m, that the bond asks for; NAN: no strap_bond is stated */
    double embedment; /* m, the same in steps of the rules */
    double room;      /* m of concrete below the axis, that a straight leg may have */
    bool hooked;      /* embedment is more than room: the legs want hooks or a plate */
} kent_straps;

/* For a force (N, factored, >= 0) and the concrete there is below the pipe's axis (m;
 * NAN: not known). Fewest legs, then the least standard diameter from strap_diameter
 * on, in mm or in inches as the rules' steps are. Fails never: of rules that state no
 * stress the force alone comes back. source 20.1 .. 20.3 */
kent_straps kent_straps_choose(const kent_rules *rules, double force, double below);

/* N that legs of a diameter (m) carry at a stress (Pa). source 20.1 */
double kent_straps_carry(int legs, double diameter, double stress);

/* m of bond (Pa) that a rod of diameter (m) needs at a stress (Pa). source 20.2 */
double kent_straps_anchorage(double diameter, double stress, double bond);

#endif
