/* What is told of the concrete of a fitting's block. */
#ifndef KENT_CONCRETE_H
#define KENT_CONCRETE_H

#include "kent_loads.h"
#include "kent_plain_concrete.h"

/* What was looked at of a block's concrete, beside the fitting and beyond 45 degrees.
 * Loads are factored, by no less than the code's own factor. */
typedef struct kent_concrete_check {
    bool made; /* a block stands; else the rest counts for nothing */
    kent_concrete_code code;
    double strength; /* Pa, at 28 days */
    bool strength_assumed;
    bool pressed;      /* the fitting presses on the block: not where it is tied down,
                          nor where the pipe passes through and nobody states by what */
    kent_sense sense;  /* in which it presses: sideways, downward, or the whole */
    double load;       /* N; NAN: nothing to press */
    double test_load;  /* N, under the test, or without one the same */
    kent_face contact; /* m; NAN: not known */
    bool contact_assumed;
    double contact_needed;         /* m2, that would do without widening; of a ring,
                                      also for what the test finds */
    double pressure, allowed, use; /* Pa, Pa, -; NAN where not pressed */
    kent_face into;                /* m, the side of the block that it presses into */
    double behind;                 /* m of concrete behind the contact */
    bool splits;      /* held only where the thrust widens inside the block */
    bool beyond_45;   /* thinner than a spread within 45 degrees asks for */
    kent_sense bends; /* which thickness that is: of a face, or of a base (downward) */
    kent_face bent;   /* m, the side that the ground then presses on */
    double thick;     /* m, that thickness */
    kent_plain_use wide;                /* all NAN where not beyond_45 */
    double needed_pressed, needed_wide; /* Pa of strength by either; NAN */
    double strength_needed; /* Pa, before the test or, without one, any pressure */
    double age;             /* s, that it has it at; NAN: never */
    bool age_asked;         /* by the design rules, whatever its strength */
} kent_concrete_check;

#endif
