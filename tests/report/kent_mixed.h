/* A main with something of everything that a report has to show: a combined bend, a
 * crest, a tee, a reducer, a dead end, an in-line valve, a turn within the joints'
 * deflection, a fitting in peat, a schematic fitting with ports of its own, accents,
 * commas and quotes in names, two scenarios. Place and data are invented. */
#ifndef KENT_MIXED_H
#define KENT_MIXED_H

#include "kent_build.h"
#include "kent_report.h"

typedef struct kent_mixed {
    kent_build build;
    kent_results *results;
} kent_mixed;

/* Runs it; whatever goes wrong fails the running test. long_names: ids of more than 40
 * letters everywhere. */
kent_mixed kent_mixed_new(bool long_names);
void kent_mixed_clear(kent_mixed *m);

/* What a report writes, gathered in text; the sink keeps pointing at it. */
kent_sink kent_mixed_sink(kent_text *text);

#endif
