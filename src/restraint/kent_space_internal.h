/* Inside the stage: where restraints stand, and what is said of neighbours. */
#ifndef KENT_SPACE_INTERNAL_H
#define KENT_SPACE_INTERNAL_H

#include "kent_holding_internal.h"

/* Fills h's footprint once it is sized. */
void kent_holding_footprint(const kent_holding_work *w, kent_holding *h);

/* Finds who is near whom among r's fittings and says so in their cautions. With n
 * fittings and s stretches of pipe about (n + s) log n steps. */
kent_status kent_space_find(const kent_model *m, kent_restraints *r, kent_error *err);

#endif
