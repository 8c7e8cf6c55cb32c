/* What config/ offers: pipes, materials, valves, soils, concretes and sets of design
 * rules, each row with its source and status. Read by the same strict reader as a case.
 */
#ifndef KENT_CATALOGUE_H
#define KENT_CATALOGUE_H

#include "kent_model.h"

/* Where a row comes from and how far it can be trusted. */
typedef struct kent_provenance {
    char source[200];
    char status[32]; /* "seen", "memory", "derived", "common practice" */
} kent_provenance;

typedef struct kent_pipe_class {
    char id[KENT_ID]; /* "DI-EN545-C30-DN600" */
    char material[KENT_ID];
    char standard[96];                                   /* "EN 545:2010" */
    double outside_diameter, wall, wall_minimum, lining; /* m; nominal, minimum */
    double pressure_rating;                              /* Pa, in service; NAN */
    double surge_rating;     /* Pa, service and surge together, occasional; NAN */
    double recurring_rating; /* Pa, the same for surges that recur; NAN */
    double test_rating;      /* Pa, under the site test; NAN */
    double nominal_size;     /* m */
    kent_provenance from;
} kent_pipe_class;

enum { KENT_CREEP_ROWS = 8, KENT_DERATING_ROWS = 12 };

typedef struct kent_derating {
    double temperature; /* K, up to which ... */
    double factor;      /* ... ratings keep this share */
} kent_derating;

typedef struct kent_material {
    char id[KENT_ID];                            /* "ductile-iron" */
    double modulus, poisson, density, roughness; /* Pa, -, kg/m3, m */
    double expansion;                            /* 1/K of length; NAN */
    double long_modulus;   /* Pa, of a plastic under lasting load; NAN */
    double lining_modulus; /* Pa, of its usual lining; 0 */
    bool plastic;
    kent_creep creep[KENT_CREEP_ROWS]; /* [creep_count] */
    size_t creep_count;
    double creep_temperature;                   /* K, that it was found at; NAN */
    kent_derating derating[KENT_DERATING_ROWS]; /* [derating_count] rising */
    size_t derating_count;
    kent_provenance from;
} kent_material;

typedef struct kent_valve_type {
    char id[KENT_ID];       /* "butterfly" */
    kent_valve_curve curve; /* count 0: known fully open only */
    double loss;            /* K fully open; NAN */
    kent_provenance from;
} kent_valve_type;

typedef struct kent_catalogue {
    kent_pipe_class *pipes;
    size_t pipe_count;
    kent_material *materials;
    size_t material_count;
    kent_valve_type *valves;
    size_t valve_count;
    kent_soil *soils; /* their source in kent_soil.source, with status in brackets */
    size_t soil_count;
    kent_concrete *concretes; /* source as of soils; place.line 0 */
    size_t concrete_count;
    kent_rules *rules;
    size_t rule_count;
} kent_catalogue;

/* From the folder; NULL: KENTLEDGE_CONFIG, else the share folder beside the installed
 * program, else the source tree it was built from. Complaints as for a case. */
kent_status kent_catalogue_read(const char *folder, kent_catalogue **out,
                                kent_complaints *complaints, kent_error *err);
void kent_catalogue_free(kent_catalogue *c);

/* The share of its ratings that a material keeps at a temperature (K), linear between
 * rows, 1 below the first; NAN above the last: not for use. 1 without rows. */
double kent_material_derating(const kent_material *material, double temperature);

const kent_pipe_class *kent_catalogue_pipe(const kent_catalogue *c, const char *id);
const kent_material *kent_catalogue_material(const kent_catalogue *c, const char *id);
const kent_valve_type *kent_catalogue_valve(const kent_catalogue *c, const char *id);

#endif
