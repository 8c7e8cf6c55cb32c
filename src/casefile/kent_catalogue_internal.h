/* For the reader of cases: the rows of a catalogue as things that can be referred to.
 */
#ifndef KENT_CATALOGUE_INTERNAL_H
#define KENT_CATALOGUE_INTERNAL_H

#include "kent_catalogue.h"
#include "kent_record.h"

void kent_catalogue_shelve(const kent_catalogue *c, kent_reader *r);

/* Rows of the lists of a file. */
void kent_catalogue_add_standard(kent_reader *r, kent_record *record,
                                 kent_catalogue *c);
void kent_catalogue_add_material(kent_reader *r, kent_record *record,
                                 kent_catalogue *c);
void kent_catalogue_add_valve(kent_reader *r, kent_record *record, kent_catalogue *c);
void kent_catalogue_add_soil(kent_reader *r, kent_record *record, kent_catalogue *c);
void kent_catalogue_add_concrete(kent_reader *r, kent_record *record,
                                 kent_catalogue *c);
void kent_catalogue_add_rules(kent_reader *r, kent_record *record, kent_catalogue *c);

/* One more of an array, not yet set; NULL: no memory, and the reader knows. */
void *kent_catalogue_grown(kent_reader *r, void **array, size_t *count, size_t size);

kent_provenance kent_record_provenance(const kent_record *record);

/* Values that a case's soil and a row of the catalogue, a case's rules and a set share:
 * those given replace what *soil and *rules hold. A bearing given in one of the four
 * ways replaces the one there was, together with the factor inside that; two of them
 * are complained of. */
void kent_record_soil(kent_reader *r, kent_record *record, kent_soil *soil);
void kent_record_rules(const kent_record *record, kent_rules *rules);

/* Complains of rules that contradict each other, in the record that has just changed
 * them. */
void kent_record_rules_check(kent_reader *r, kent_record *record,
                             const kent_rules *rules);

/* Whether a bearing is given in any of the four ways; 0 is one. */
bool kent_soil_has_bearing(const kent_soil *soil);

/* Pairs of a list ( (a, b), ... ) into a[], b[]; returns how many, 0 after a complaint
 * or when there are more than most. A KENT_RATIO is a number without unit. */
size_t kent_record_pairs(kent_reader *r, kent_record *record, const char *key,
                         kent_kind first, kent_kind second, size_t most, double *a,
                         double *b);

/* Elements of a plastic wall, from the key `creep`: how many, times rising. */
size_t kent_record_creep(kent_reader *r, kent_record *record,
                         kent_creep out[KENT_CREEP_ROWS]);

/* (opening, K) pairs to a curve; complains where they cannot make one. */
bool kent_record_curve(kent_reader *r, kent_record *record, kent_valve_curve *out);

#endif
