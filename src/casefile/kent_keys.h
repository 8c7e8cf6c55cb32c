/* The key table: every key a case or a catalogue file may hold, once. The reader, its
 * error texts, the manual's test and later sweeps and fuzzing walk it. */
#ifndef KENT_KEYS_H
#define KENT_KEYS_H

#include "kent_units.h"
#include <stdbool.h>
#include <stddef.h>

typedef enum kent_value {
    KENT_VALUE_QUANTITY, /* a string with a unit of `kind` */
    KENT_VALUE_NUMBER,   /* a bare number: a ratio, kv, cv */
    KENT_VALUE_COUNT,    /* a whole number */
    KENT_VALUE_SWITCH,   /* true or false */
    KENT_VALUE_TEXT,
    KENT_VALUE_ID,   /* the name of a thing defined by this key */
    KENT_VALUE_REF,  /* the id of a thing defined elsewhere; `words`: its group */
    KENT_VALUE_WORD, /* one of `words`, separated by '|' */
    KENT_VALUE_LIST, /* a list of groups (named in `words`) or of values */
    KENT_VALUE_GROUP,
    KENT_VALUE_STATION, /* "1+198": a length along the main */
    KENT_VALUE_TURN,    /* "45 deg right": an angle in plan, + to the left */
    KENT_VALUE_VECTOR,  /* three numbers */
    KENT_VALUE_EITHER   /* a bare number (least, most), or a quantity of `kind` */
} kent_value;

typedef struct kent_key {
    const char *group; /* "case", "point", "pipe", "soil" ... */
    const char *key;
    kent_value value;
    kent_kind kind;       /* of a quantity */
    double least, most;   /* SI; -INFINITY, INFINITY: no limit; of a text: bytes */
    bool above_least;     /* least itself is refused */
    const char *words;    /* see kent_value; of a quantity: a word that may stand for
                             "none" (read as INFINITY) */
    const char *fallback; /* what holds when it is left out; "required"; "none" */
    const char *since;    /* "0.1" */
    const char *says;     /* one line for the manual */
} kent_key;

/* Keys of one group stand together, groups of a case before those of the catalogue. */
extern const kent_key KENT_KEYS[];
extern const size_t KENT_KEY_COUNT;

const kent_key *kent_key_find(const char *group, const char *key);

/* The keys of a group, [*count], or NULL. */
const kent_key *kent_key_group(const char *group, size_t *count);

/* Whether leaving it out is an error. */
bool kent_key_is_required(const kent_key *key);

/* The range in the system's display unit of its kind: "0 to 100 m", "above 0 to 20000
 * mm", "any". */
void kent_key_range(const kent_key *key, kent_system system, char *out, size_t size);

/* "a pipe", "water": a group as messages name it. */
const char *kent_key_group_word(const char *group);

/* The key of the group nearest to a misspelt one, capitals or not; NULL: none is near.
 */
const char *kent_key_nearest(const char *group, const char *key);

/* Spelling variants of one word ("catalog", "vapor", "non-return", "taper") to ours. */
const char *kent_spelling(const char *word);

#endif
