/* One group of a case or catalogue file, read by the key table: every key known, of the
 * right type, unit and range, what is required there, references found. What per-group
 * code does with it is only moving values. */
#ifndef KENT_RECORD_H
#define KENT_RECORD_H

#include "kent_directory.h"
#include "kent_keys.h"
#include "kent_tree.h"

enum { KENT_RECORD_FIELDS = 48 };

/* Groups that references point to. */
typedef enum kent_shelf {
    KENT_SHELF_POINTS,
    KENT_SHELF_SOILS,
    KENT_SHELF_VALVES,
    KENT_SHELF_PUMPS,
    KENT_SHELF_DEVICES,      /* pumps too; by kent_device_shelf_index */
    KENT_SHELF_FIXED_LEVELS, /* these two by the id of their point */
    KENT_SHELF_OUTFLOWS,
    KENT_SHELF_PIPES,
    KENT_SHELF_STATES,
    KENT_SHELF_SCENARIOS,
    KENT_SHELF_FITTINGS, /* only so that ids are unique */
    KENT_SHELF_PIPE_CLASSES,
    KENT_SHELF_MATERIALS,
    KENT_SHELF_VALVE_TYPES,
    KENT_SHELF_SOIL_ROWS,
    KENT_SHELF_CONCRETES,
    KENT_SHELF_RULES,
    KENT_SHELF_COUNT
} kent_shelf;

/* What "1+198" means; in the order of the words of site.station_style. */
typedef enum kent_station_style {
    KENT_KM_M,
    KENT_100M_M,
    KENT_100FT_FT
} kent_station_style;

typedef struct kent_reader {
    kent_tree *tree;
    kent_units *units; /* the caller's: one database serves every file */
    kent_complaints *complaints;
    kent_system system; /* of examples in messages */
    kent_station_style station_style;
    kent_directory shelves[KENT_SHELF_COUNT];
    bool failed; /* out of memory */
} kent_reader;

typedef struct kent_field {
    const kent_twig *twig; /* NULL: left out, or refused */
    double number;         /* SI; NAN: left out; INFINITY: the word of kent_key.words */
    bool bare;             /* of KENT_VALUE_EITHER: a number without unit */
    const char *text;      /* NULL: left out; lives as long as the tree */
    int index;           /* of a word among `words`, of a reference on its shelf; -1 */
    bool from_catalogue; /* a soil found on the shelf of rows */
    kent_vec3 vector;
} kent_field;

typedef struct kent_record {
    char label[224]; /* starts its messages: "pipe \"A\": " */
    const kent_twig *twig;
    kent_place place;
    const kent_key *keys; /* [count] */
    size_t count;
    bool sound; /* nothing in it was complained of */
    kent_field fields[KENT_RECORD_FIELDS];
} kent_record;

/* owner: label of the group it stands in, or ""; position: from 1 in a list, else 0.
 * Complaints go to the reader's. */
void kent_record_read(kent_reader *r, const kent_twig *twig, const char *group,
                      const char *owner, size_t position, kent_record *out);

/* Every element of a list of groups has to be one; NULL and a complaint otherwise. */
const kent_twig *kent_record_element(kent_reader *r, const kent_twig *list,
                                     const char *owner, size_t index);

/* The field of a key that the group has; asserts that it has. */
const kent_field *kent_record_field(const kent_record *record, const char *key);
bool kent_record_has(const kent_record *record, const char *key);
double kent_record_number(const kent_record *record, const char *key); /* NAN */
double kent_record_number_or(const kent_record *record, const char *key, double other);
bool kent_record_switch(const kent_record *record, const char *key, bool other);

/* Copies a text into [size], or `other` where it was left out; other may be NULL. */
void kent_record_copy(const kent_record *record, const char *key, const char *other,
                      char *out, size_t size);

/* A complaint about the record, at the key's line or, without one, at its own. */
__attribute__((format(printf, 4, 5))) void kent_record_complain(kent_reader *r,
                                                                kent_record *record,
                                                                const char *key,
                                                                const char *fmt, ...);

/* One value of a list that is no group: a number, or a quantity of a kind. Complains
 * and gives NAN where it is neither. */
double kent_record_item(kent_reader *r, kent_record *record, const kent_twig *item,
                        const char *key, bool quantity, kent_kind kind);

/* A reference by its text; -1 after a complaint. */
int kent_record_lookup(kent_reader *r, kent_record *record, const kent_twig *item,
                       const char *key, kent_shelf shelf);

/* Puts an id on a shelf; close a shelf once it is full: sorts it and complains of ids
 * that stand there twice. */
void kent_reader_shelve(kent_reader *r, kent_shelf shelf, const char *id, int index,
                        kent_place place);
void kent_reader_close_shelf(kent_reader *r, kent_shelf shelf);
void kent_reader_clear(kent_reader *r); /* frees its shelves */

#endif
