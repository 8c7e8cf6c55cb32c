/* Restrained lengths of a fitting's legs, and how far each may run. */
#ifndef KENT_LEG_INTERNAL_H
#define KENT_LEG_INTERNAL_H

#include "kent_restraint.h"

/* Where fittings stand along spans: by span, then chainage, then fitting. */
typedef struct kent_standing {
    int span, fitting;
    double chainage; /* m */
} kent_standing;

typedef struct kent_standings {
    kent_standing *at; /* [count] */
    size_t count;
} kent_standings;

kent_status kent_standings_find(const kent_model *m, kent_standings *out,
                                kent_error *err);
void kent_standings_clear(kent_standings *s);

/* Which keys are missing for a length; several may be. */
typedef enum kent_lack {
    KENT_LACK_UNIT_WEIGHT = 1,
    KENT_LACK_FRICTION_ANGLE = 2,
    KENT_LACK_COHESION = 4,
    KENT_LACK_FRICTION_RATIO = 8,
    KENT_LACK_ADHESION_RATIO = 16,
    KENT_LACK_PASSIVE_RATIO = 32,
    KENT_LACK_COVER = 64,
    KENT_LACK_PIPE_MASS = 128,
    KENT_LACK_SOIL = 256, /* not stated, or cannot be relied on */
    KENT_LACK_PIPE = 512, /* the leg is no pipe of the network */
    KENT_LACK_GRIP = 1024 /* the values given make no friction at all */
} kent_lack;

/* Everything that gives one leg's length, kept for the hand calculation. */
typedef struct kent_leg_work {
    const kent_pipe *pipe;
    const kent_soil *soil;
    kent_trench trench;
    kent_soil_grip grip;
    double pipe_weight; /* N/m, before the water displaced is taken off */
    double displaced;   /* N/m, 0 above the water table */
    double sleeve;      /* factor on friction: 1 for a bare pipe */
    bool bend;          /* half the perimeter; else the whole */
    bool bears;         /* half the passive resistance counts */
    bool turns_back;    /* a bend beyond a right angle: each leg by friction alone */
    double force;       /* N, pressure x area of a bend's leg, or the whole thrust */
    double angle;       /* rad */
    double factor;
    double friction, bearing; /* N/m, as used */
    double length;            /* m */
} kent_leg_work;

/* How the legs of a fitting are restrained. */
typedef struct kent_leg_rule {
    size_t first, count; /* ports that are legs; count is an upper bound */
    const char *says;    /* where, as the end of a sentence */
    kent_fitting_type type;
    bool bend;
    bool either; /* one leg alone is enough */
} kent_leg_rule;

/* By its type; a reducer that also turns pulls on both legs, as a bend does. */
const kent_leg_rule *kent_leg_rule_of(const kent_fitting *fitting);

/* Whether fitting and thrust (N) let the passive resistance of the trench side count.
 */
bool kent_leg_bears(const kent_fitting *fitting, kent_vec3 thrust);

/* One leg under a thrust (N). Returns 0, or the keys that are missing as a sum of
 * kent_lack: then no length is given. */
unsigned kent_leg_prepare(const kent_model *m, const kent_fitting *fitting, size_t port,
                          kent_vec3 thrust, double factor, kent_leg_work *out);

/* Where a leg of this length would end: whether before anything that breaks it. Says
 * what it meets in notes. */
bool kent_leg_fits(const kent_model *m, const kent_standings *standings, size_t fitting,
                   size_t port, double length, kent_notes *notes);

/* The nearest point along the port's pipe, going out of the fitting, whose soil counts:
 * its index and the distance (m). -1: none to the end of the pipe, at that distance. */
int kent_leg_sound(const kent_model *m, const kent_port *port, double *distance);

/* The soil of a point: its own or the ground's; NULL: not stated. */
const kent_soil *kent_point_soil(const kent_model *m, int point);
bool kent_soil_counts(const kent_soil *soil); /* stated, reliable, some bearing */

#endif
