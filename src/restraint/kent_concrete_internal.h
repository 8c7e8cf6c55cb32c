/* The concrete of one fitting's block, on its way. */
#ifndef KENT_CONCRETE_INTERNAL_H
#define KENT_CONCRETE_INTERNAL_H

#include "kent_holding_internal.h"

/* Sets what the block's concrete is made for, once it is known what governs and what
 * share of it h's block takes. */
void kent_concrete_prepare(kent_holding_work *w, const kent_holding *h);

/* m along the pipe that the shape of a fitting surely presses on; 0: nothing is known.
 * source docs/theory 19.4 */
double kent_concrete_body(const kent_holding_work *w);

/* Whether the concrete takes what the fitting presses on it, where the case states on
 * what; h->concrete is what was looked at. */
bool kent_concrete_bears(const kent_holding_work *w, kent_holding *h);

/* Fills h's concrete and quantities, where it has a block. */
void kent_concrete_finish(const kent_holding_work *w, kent_holding *h);

void kent_concrete_caution(const kent_holding_work *w, kent_holding *h);

/* The hand calculation: of a thickness (put as t, or t's symbol) with the rest of a
 * block, and of what was looked at. longer: the formula of the side's longer edge. */
void kent_concrete_derive_thickness(const kent_holding_work *w, kent_derivation *d,
                                    kent_face side, double thickness,
                                    const char *longer, const char *says);
void kent_concrete_derive(const kent_holding_work *w, kent_holding *h);

/* Totals, the greatest age and what all blocks share, once every fitting is through.
 * Returns false where memory gave out. */
bool kent_concrete_conclude(const kent_model *m, kent_restraints *r);

#endif
