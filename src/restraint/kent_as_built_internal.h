#ifndef KENT_AS_BUILT_INTERNAL_H
#define KENT_AS_BUILT_INTERNAL_H

#include "kent_holding_internal.h"

/* Fills h's as_built, once everything else of it is worked out. */
void kent_as_built_find(const kent_holding_work *w, kent_holding *h);
void kent_as_built_clear(kent_as_built *b);

/* Which rules a built block breaks, into notes. Returns false where the ground before
 * its face may not be leant on, whatever it bears. */
bool kent_as_built_judge(const kent_holding_work *w, const kent_holding *h,
                         const kent_built *built, const kent_block *block,
                         kent_notes *notes);

#endif
