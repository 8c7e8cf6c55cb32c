/* Inside report/ only: a set of design rules in words. */
#ifndef KENT_TOLD_RULES_H
#define KENT_TOLD_RULES_H

#include "kent_shown.h"
#include "kent_text.h"

/* "safety factor 1.50; height at most 0.50 of ...; one block at most 60.00 m³". */
void kent_told_shape(const kent_rules *r, kent_system units, kent_text *out);

/* What is asked beyond that, each with "; " before it; nothing of what is not. */
void kent_told_asked(const kent_rules *r, kent_system units, kent_text *out);

#endif
