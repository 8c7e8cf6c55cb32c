/* Inside report/ only: a derivation as printed lines.
 *
 * A heading stands alone at the left margin. Every other line starts with two blanks
 * and is in one of two regular forms, so that a program can work all of it out again
 * from its printed digits:
 *
 *   put in     SYMBOL = VALUE UNIT   what it is (where it comes from)
 *   computed   SYMBOL = FORMULA = NUMBERS = VALUE UNIT   (eq. N)   what it is
 *
 * Three blanks end the unit, which may hold single ones. A line that would be too long
 * goes on below, six blanks in: with "= NUMBERS" and "= VALUE UNIT   (eq. N)" each on a
 * line of its own, and what it is on another, which holds no "= " at its start.
 * Arithmetic that is too long even so goes on eight blanks in, broken after an operator
 * or a blank: take the line break and the eight blanks away and it is whole. NUMBERS is
 * FORMULA with numbers for symbols; angles carry "deg", and sin, cos and tan take
 * degrees.
 */
#ifndef KENT_STEPS_H
#define KENT_STEPS_H

#include "kent_derivation.h"
#include "kent_text.h"

/* limit: columns of a line, 0 for none. */
void kent_steps_print(const kent_derivation *d, kent_system system, size_t limit,
                      kent_text *out);

#endif
