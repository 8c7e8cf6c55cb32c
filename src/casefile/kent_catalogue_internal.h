/* For the reader of cases: the rows of a catalogue as things that can be referred to.
 */
#ifndef KENT_CATALOGUE_INTERNAL_H
#define KENT_CATALOGUE_INTERNAL_H

#include "kent_catalogue.h"
#include "kent_record.h"

void kent_catalogue_shelve(const kent_catalogue *c, kent_reader *r);

/* Values that a case's soil and a row of the catalogue, a case's rules and a set share:
 * those given replace what *soil and *rules hold. */
void kent_record_soil(const kent_record *record, kent_soil *soil);
void kent_record_rules(const kent_record *record, kent_rules *rules);

/* Pairs of a list ( (a, b), ... ) into a[], b[]; returns how many, 0 after a complaint
 * or when there are more than most. first_kind: the first of each is a quantity. */
size_t kent_record_pairs(kent_reader *r, kent_record *record, const char *key,
                         const kent_kind *first_kind, size_t most, double *a,
                         double *b);

/* (opening, K) pairs to a curve; complains where they cannot make one. */
bool kent_record_curve(kent_reader *r, kent_record *record, kent_valve_curve *out);

#endif
