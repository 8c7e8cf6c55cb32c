/* A case being moved from records into a model. */
#ifndef KENT_CASE_INTERNAL_H
#define KENT_CASE_INTERNAL_H

#include "kent_case.h"
#include "kent_catalogue_internal.h"
#include "kent_rows.h"

typedef struct kent_filling {
    kent_reader reader;
    const kent_catalogue *catalogue;
    const kent_system *shown; /* NULL: the case's own */
    kent_model *model;
    kent_record root;                      /* the case's own group */
    kent_rows *points_table, *pipes_table; /* NULL: the case names none */
    size_t route_capacity;                 /* of model->route, and so on */
    size_t event_capacity;
    size_t law_capacity;
    size_t port_capacity;
    size_t level_capacity, scenario_state_capacity;
    size_t built_leg_capacity;
    size_t creep_capacity, obstacle_capacity, together_capacity;
    size_t closes_capacity;
    size_t running_capacity, without_capacity, burst_capacity;
    const kent_material *creeping; /* whose elements stand in the model ... */
    size_t creep_first;            /* ... from here on */
    bool knows_temperature;        /* of the water: the case gives it */
} kent_filling;

/* A whole case from its root, of the reader's tree or made up of its twigs. f: reader
 * with its tree, units and shelves of the catalogue, catalogue and shown are set, all
 * else is nil; nothing of its own is left in it. Fails as kent_case_read. */
kent_status kent_fill_case(kent_filling *f, const kent_twig *root, const char *path,
                           kent_model **out, kent_error *err);

/* Reads the group under a key of a record; without one *out is empty. Returns whether
 * it was there. */
bool kent_fill_group(kent_filling *f, const kent_record *parent, const char *key,
                     kent_record *out);

/* Reads the tables that the case names. Fails like kent_rows_read. */
kent_status kent_fill_tables(kent_filling *f, kent_error *err);

/* What stands once in a case; each notes what it assumes. Ground and loads come after
 * the lists that they refer to. */
void kent_fill_head(kent_filling *f, const char *path);
void kent_fill_water(kent_filling *f);
void kent_fill_site(kent_filling *f);
void kent_fill_rules(kent_filling *f);

/* After soils and loads: a factor meant for one table's bearings, used with others. */
void kent_fill_rules_check(kent_filling *f);
void kent_fill_concrete(kent_filling *f);
void kent_fill_concrete_check(kent_filling *f); /* what blocks go by unless stated */
void kent_fill_ground(kent_filling *f);
void kent_fill_loads(kent_filling *f);
void kent_fill_limits(kent_filling *f);
void kent_fill_solver(kent_filling *f);
/* Once fittings are derived: that what was built is one, and its legs are its own. */
kent_status kent_fill_built_check(kent_filling *f);
void kent_fill_creep(kent_filling *f); /* cautions where nothing creeps that should */

/* What is stated for the restraint of a fitting: slope, backing, shares, lengths. */
void kent_fill_stated(kent_filling *f, kent_record *record, kent_fitting_note *n);

/* Moves the index-th element of a list; its place in the model's array stands zeroed.
 */
typedef void kent_fill_one(kent_filling *f, kent_record *record, size_t index);
kent_fill_one kent_fill_point, kent_fill_pipe, kent_fill_fixed_level, kent_fill_outflow,
    kent_fill_valve, kent_fill_pump, kent_fill_check_valve, kent_fill_control_valve,
    kent_fill_surge_tank, kent_fill_one_way_tank, kent_fill_air_vessel,
    kent_fill_relief_valve, kent_fill_air_valve, kent_fill_state, kent_fill_scenario,
    kent_fill_soil, kent_fill_ground_zone, kent_fill_fitting, kent_fill_built;

/* Of a pipe: its ratings, de-rated where its material is a warm plastic, and the
 * standard that they are by. row, material: NULL where none is named. */
void kent_fill_ratings(kent_filling *f, kent_record *record, const kent_pipe_class *row,
                       const kent_material *material, kent_pipe *p);
void kent_fill_standard(kent_filling *f, kent_record *record,
                        const kent_pipe_class *row, kent_pipe *p);

/* m^2.5/s at full opening, by the one that is given of loss, kv and cv; NAN after a
 * complaint where none or more are. */
double kent_fill_capacity(kent_filling *f, kent_record *record, double size);

/* An index on KENT_SHELF_DEVICES: the kind, and which of it. */
enum { KENT_DEVICES_OF_A_KIND = 1 << 26 };

void kent_fill_event(kent_filling *f, kent_record *record, const kent_scenario *s);

/* The states that a scenario names; without a list it starts from every one. */
void kent_fill_scenario_states(kent_filling *f, kent_record *record, kent_scenario *s);

/* Index of a soil that a record names, -1 without one; a soil of the catalogue is
 * copied into the model when it is first named. */
int kent_fill_soil_index(kent_filling *f, const kent_record *record, const char *key);

/* A value with its unit, as everything said of the case shows it. */
void kent_fill_show(const kent_filling *f, double si, kent_kind kind, char *out,
                    size_t size);

/* Notes what nobody gave: "what\tvalue\twhy". */
void kent_fill_assume(kent_filling *f, const char *what, const char *value,
                      const char *why);

/* Of one device and its key; then, what a key gives, else the usual value, noted as
 * assumed ("none" where it is not finite). */
void kent_fill_assume_of(kent_filling *f, const kent_record *record,
                         kent_device_kind kind, const char *key, const char *value,
                         const char *why);
double kent_fill_usual(kent_filling *f, const kent_record *record,
                       kent_device_kind kind, const char *key, double usual,
                       const char *why);

/* The same, with a value to be displayed. */
void kent_fill_assume_value(kent_filling *f, const char *what, double si,
                            kent_kind kind, const char *why);

#endif
