/* Load cases made by hand for the tests of what holds them: water at rest at a stated
 * pressure in every port, so that each thrust is p A alone. */
#ifndef KENT_HAND_H
#define KENT_HAND_H

#include "kent_build.h"
#include "kent_check.h"
#include "kent_restraint.h"

typedef struct kent_hand_case {
    const char *name;
    kent_case_kind kind;
    double factor;
    double pressure; /* Pa */
} kent_hand_case;

/* The same cases on every fitting; kent_hand_clear frees what it holds. */
kent_loads_result kent_hand_loads(const kent_model *m, const kent_hand_case *cases,
                                  size_t count);
void kent_hand_clear(kent_loads_result *loads);

/* Sizes what holds them, failing the test where that fails; free it. */
kent_restraints *kent_hand_size(const kent_build *b, const kent_hand_case *cases,
                                size_t count);

/* Whether a caution, or a remark, holds these words; the last fails the test where no
 * caution does. */
bool kent_hand_says(const kent_holding *h, const char *words);
bool kent_hand_remarks(const kent_holding *h, const char *words);
void kent_hand_expect(const kent_holding *h, const char *words);

/* Works out every printed formula of a hand calculation again from its printed digits,
 * failing the test where one does not follow; returns how many there were. */
size_t kent_hand_lines(const kent_derivation *d, kent_system system);

#endif
