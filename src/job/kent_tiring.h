/* How far and how often a surge that recurs swings a plastic pipe. Information for the
 * maker's cyclic design, and no judgement. */
#ifndef KENT_TIRING_H
#define KENT_TIRING_H

#include "kent_job.h"

typedef struct kent_tiring {
    double amplitude; /* Pa, half of highest less lowest, where that is most */
    double mean;      /* Pa gauge, of the two */
    double highest, lowest;
    double chainage; /* m from the pipe's start */
    int point;       /* -1: between points */
    double rating;   /* Pa, in service; NAN */
    double cycles;   /* over the life; NAN: not both are given */
} kent_tiring;

/* Of one pipe in one march (index into results' scenarios). Returns whether there is
 * anything to tell: a plastic, a scenario that recurs and is not for comparison, and a
 * swing. source docs/theory 18.7 */
bool kent_tiring_of(const kent_results *r, size_t march, size_t pipe, kent_tiring *out);

#endif
