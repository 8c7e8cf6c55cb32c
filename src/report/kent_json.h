/* Inside report/ only: JSON written element by element, and values that may not be
 * there (null). */
#ifndef KENT_JSON_H
#define KENT_JSON_H

#include "kent_report.h"

#include <jansson.h>

typedef struct kent_writer {
    const kent_results *results;
    const kent_model *model;
    kent_sink sink;
    kent_status status; /* the first failure; after it nothing more is written */
    bool listed;        /* an element of the open list stands already */
} kent_writer;

void kent_json_put_text(kent_writer *w, const char *text);

/* Writes and lets go of value; NULL: it could not be made. */
void kent_json_put(kent_writer *w, json_t *value);

/* head: what stands before its first element, "[" included. */
void kent_json_open_list(kent_writer *w, const char *head);
void kent_json_put_element(kent_writer *w, json_t *value);

json_t *kent_json_real(double value); /* null where it is not finite */
json_t *kent_json_count(size_t value);

/* Text of a case need not be UTF-8: then its bytes beyond ASCII become '?'. */
json_t *kent_json_words(const char *text);
json_t *kent_json_vector(kent_vec3 v); /* [x, y, z]; null where it is not known */
json_t *kent_json_notes(const kent_notes *notes);
json_t *kent_json_grave(const kent_notes *notes); /* of what is unsafe as it stands */

/* An object under construction; made false by the first value that could not be. */
typedef struct kent_object {
    json_t *json;
    bool ok;
} kent_object;

kent_object kent_object_new(void);
void kent_object_set(kent_object *o, const char *key, json_t *value); /* keeps value */
json_t *kent_object_done(kent_object o); /* NULL where something failed */
kent_object kent_list_new(void);
void kent_list_append(kent_object *list, json_t *value);

/* ---- parts of results.json ---------------------------------------------------------
 */

/* What a fitting reaches as built; null where nothing is stated. */
json_t *kent_json_built(const kent_results *r, size_t fitting);

void kent_json_put_limits(kent_writer *w);
void kent_json_put_pulls(kent_writer *w); /* null: none */
void kent_json_put_runs(kent_writer *w);

/* Of a fitting; null without a block. Quantities also of all together. */
json_t *kent_json_concrete(const kent_concrete_check *c);
json_t *kent_json_quantities(const kent_quantities *q);

/* Block and joints side by side; null where nothing is to be held. */
json_t *kent_json_either(const kent_either *e);

/* A list: systems of restrained lengths. */
void kent_json_put_systems(kent_writer *w);

/* Load cases asked for; of a fitting the next to what governs (null: none) and what
 * pushes other ways. */
json_t *kent_json_completeness(const kent_results *r);
json_t *kent_json_runner_up(const kent_fitting_loads *loads, const kent_holding *h);
json_t *kent_json_other_ways(const kent_fitting_loads *loads, const kent_holding *h);

/* The restrained lengths of one fitting: a list, empty where none can be given. */
json_t *kent_json_legs(const kent_model *m, const kent_fitting *f,
                       const kent_holding *h);

/* Of one fitting: whether its block stays in place, and its straps; null without one.
 */
json_t *kent_json_stability(const kent_fitting_loads *loads, const kent_holding *h);

/* Of one march, by its index into results' scenarios. */
void kent_json_put_screening(kent_writer *w, size_t march);
void kent_json_put_swings(kent_writer *w, size_t march);

/* r->sensitivity, which must be there: a row per fitting and variation, first with
 * nothing moved. */
void kent_json_put_sensitivity(kent_writer *w);

/* Of one fitting: its bearing by every way, the shares of block and joints, and who
 * else stands in that ground. */
json_t *kent_json_ground(const kent_results *r, size_t fitting);

/* Scenarios beside those whose events they repeat: pairs, the other one first. */
void kent_json_put_twins(kent_writer *w);

#endif
