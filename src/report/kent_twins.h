/* Inside report/ only: a scenario beside the one whose events it repeats, from the same
 * state. */
#ifndef KENT_TWINS_H
#define KENT_TWINS_H

#include "kent_job.h"

enum { KENT_ITSELF, KENT_BESIDE, KENT_TWINS }; /* the one that repeats, the other */

typedef struct kent_twins {
    int march[KENT_TWINS]; /* indices into results' scenarios */
} kent_twins;

/* One place in both: extremes of pressure, Pa gauge; NAN: not there. */
typedef struct kent_twin_place {
    int point;
    double highest[KENT_TWINS], lowest[KENT_TWINS];
} kent_twin_place;

/* The twins of one march; false: it repeats none, or that was not run. */
bool kent_twins_of(const kent_results *r, size_t march, kent_twins *out);

/* Points with a fitting or a device, each once, in their order, into out [point_count].
 * Returns how many. */
size_t kent_twins_places(const kent_results *r, const kent_twins *t,
                         kent_twin_place *out);

/* m3: the largest cavity; 0: none opened. */
double kent_twins_cavity(const kent_scenario_result *run);

#endif
