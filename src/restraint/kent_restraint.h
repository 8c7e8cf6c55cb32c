/* What holds a fitting: a bearing block, a gravity block, a base, or a restrained
 * length on each leg; or the statement that nothing here can, and what would help.
 *
 * The plain functions below take numbers and give numbers; kent_restraint_size applies
 * them, with one set of design rules, to every fitting of a model. */
#ifndef KENT_RESTRAINT_H
#define KENT_RESTRAINT_H

#include "kent_as_built.h"
#include "kent_bearing.h"
#include "kent_concrete.h"
#include "kent_derivation.h"
#include "kent_loads.h"
#include "kent_other_way.h"
#include "kent_pull.h"
#include "kent_route.h"
#include "kent_space.h"
#include "kent_stability.h"
#include "kent_straps.h"
#include "kent_quantity.h"
#include "kent_system.h"

/* ---- plain functions ------------------------------------------------------------- */

/* Rankine's coefficients of passive and active earth pressure; friction_angle rad. */
double kent_rankine_passive(double friction_angle);
double kent_rankine_active(double friction_angle);

/* Passive pressure, Pa: Kp s + 2 c sqrt(Kp), s the effective vertical stress Pa. */
double kent_passive_pressure(double friction_angle, double cohesion, double stress);

/* Least width x height, sides multiples of rules->side_step, that gives area (m2) under
 * a height of at most `limit` (m) and the rules' width to height; ties to the taller.
 * Returns false where no face serves. */
bool kent_face_choose(const kent_rules *rules, double area, double limit,
                      kent_face *out);

/* m: the greatest height of a face centred on a pipe whose axis lies at depth (m). */
double kent_face_height_limit(const kent_rules *rules, double axis_depth);

/* m: thickness of a bearing block: least allowed, also as concrete behind the fitting,
 * and spread within 45 degrees, rounded up. */
double kent_block_thickness(const kent_rules *rules, kent_face face, double diameter);

/* m3 of a gravity block that weighs factor x upward (N). unit_weight N/m3, of concrete,
 * less water's where it is under the water table. */
double kent_gravity_volume(double upward, double factor, double unit_weight);

/* N/m: how a main that curves through an angle (rad, > 0) at a radius (m) presses on
 * the soil beside it, from the thrust of the whole curve (N). source 10.28 */
double kent_curve_side_load(double thrust, double angle, double radius);

/* Friction and bearing of soil on a metre of pipe, published iron-pipe form. */
typedef struct kent_soil_grip {
    double pipe_weight, water_weight; /* N/m */
    double earth_load; /* N/m, soil prism on the pipe: unit weight x cover x diameter */
    double friction;   /* N/m, Fs at bends (adhesion on half the perimeter) */
    double friction_whole; /* N/m, Fs with adhesion on the whole perimeter */
    double bearing;        /* N/m, Rs */
} kent_soil_grip;

typedef struct kent_trench {                              /* inputs, all SI */
    double outside_diameter, cover;                       /* m */
    double pipe_weight, water_weight;                     /* N/m */
    double unit_weight;                                   /* N/m3 */
    double friction_angle, cohesion;                      /* rad, Pa */
    double friction_ratio, adhesion_ratio, passive_ratio; /* - */
    double slope; /* rad, of the pipe against the level; 0: level */
} kent_trench;

kent_soil_grip kent_soil_grip_of(const kent_trench *t);

/* N/m: the bearing that USACE ETL 1110-3-446 counts on in place of Rs, which leaves
 * cohesion out. source 11.19 */
double kent_soil_bearing_etl(const kent_trench *t);

/* m, before rounding up to whole pipes. force N is pressure x area (unfactored), angle
 * rad; friction and bearing N/m; bearing 0 for a crest. */
double kent_restrained_length_bend(double force, double angle, double factor,
                                   double friction, double bearing);
double kent_restrained_length_end(double force, double factor, double friction);
/* The same of a tee's branch, less what the bearing of its restrained run takes off
 * (credit N); 0 where that is all. source 11.21 */
double kent_restrained_length_branch(double force, double factor, double credit,
                                     double friction);

/* ---- every fitting of a model ---------------------------------------------------- */

typedef enum kent_block_type {
    KENT_BLOCK_NONE,
    KENT_BLOCK_BEARING,
    KENT_BLOCK_GRAVITY, /* with a face for the sideways part */
    KENT_BLOCK_BASE     /* with a face for the sideways part */
} kent_block_type;

typedef struct kent_block {
    kent_block_type type;
    double bearing_area; /* m2 asked for; of the face, or of the base for a base */
    double width, height, thickness, volume; /* m, m3; a base: along, across, deep */
    double bearing_pressure; /* Pa reached on the face or base at the factored load */
    double utilisation;      /* factored load over resistance */
    double factor_reached;
    bool has_face; /* gravity, base: a face takes the sideways part */
    kent_face face;
    double face_thickness, face_utilisation;
    double face_volume; /* m3, not in volume; 0 without a face of its own */
    bool own_side;  /* gravity: its own side is the face, and face_thickness what stands
                       between pipe and side */
    bool low;       /* gravity: kept as low as a face must be, for that side */
    int widened;    /* steps of the rules by which it was enlarged until it stands */
    bool flatter;   /* gravity: widened to press less, no heavier than it must be */
    bool submerged; /* gravity, base: weight less the water it displaces */
    kent_sense sense; /* that the body is for, its face apart; of utilisation */
} kent_block;

/* What a restrained length comes to an end in. */
typedef enum kent_leg_end {
    KENT_LEG_IN_GROUND,    /* plain pipe */
    KENT_LEG_AT_STRUCTURE, /* a wall piece, which holds what is left */
    KENT_LEG_AT_DEAD_END,  /* one with restrained joints: the two are one system */
    KENT_LEG_AT_FITTING,   /* one that breaks it: it does not fit */
    KENT_LEG_AT_SOFT,      /* ground that gives no restraint: it does not fit */
    KENT_LEG_AT_PIPE_END   /* no pipe goes on: it does not fit */
} kent_leg_end;

typedef struct kent_leg { /* restrained length of one port */
    size_t port;          /* 0 .. port_count - 1 */
    double length;        /* m, as computed by the form that sizes */
    int pipes;            /* whole pipes; 0 where no pipe length is known */
    bool fits;            /* whole pipes end before what breaks them (11) */
    double by_form[2];    /* m, by kent_length_form; NAN: that form has none for this */
    kent_length_form form; /* that sizes */
    double pull;           /* N, unfactored, along the leg at the fitting */
    double factor;         /* on it */
    double demand; /* N, factored, that the ground along it must make up (11.16) */
    bool bears;    /* half the bearing of the trench side counts along it */
    double credit; /* N, that the bearing of a tee's restrained run takes off (11.20) */
    kent_leg_end end;
    int end_point;         /* where; -1: in plain pipe */
    double reach;          /* m of it restrained: whole pipes, or up to what ends it */
    bool lengthened;       /* by the system that it leads out of (22) */
    double structure_pull; /* N, factored, that a structure takes at its end; else 0 */
} kent_leg;

/* A block and restrained joints beside each other, whichever is chosen. */
typedef struct kent_either {
    bool looked_at;             /* something is to be held, and not as a group apart */
    kent_block block;           /* that is built, or in place of joints would be */
    kent_quantities quantities; /* of that; nil without */
    const char *no_block;       /* why there can be none, in short; NULL */
    bool joints;                /* restrained joints hold it, or would */
    const char *no_length;      /* why they have no length, in short; NULL */
} kent_either;

typedef struct kent_holding {
    int governing;    /* index into the fitting's load cases; -1: no thrust at all */
    kent_sense sense; /* sideways, upward or downward: whichever uses most; the whole
                         (KENT_RESULTANT) where restrained joints are chosen */
    int runner_up;    /* the next case; -1 */
    double runner_up_load;        /* N, its factored load in the same sense and way */
    double runner_up_margin;      /* what governs over it, less 1; NAN: no next one */
    int by_sense[KENT_SENSES];    /* governing case of each sense; -1 */
    kent_restraint_choice chosen; /* by the case, or in its place by the rules */
    double block_share, joints_share; /* of the thrust that block and joints are for,
                                         where both hold it; NAN */
    bool held;          /* false: nothing here can hold it, or nothing was asked */
    bool soil_beside;   /* a curve, left to the soil beside it, all along */
    bool needs_nothing; /* within joint deflection, or no thrust */
    bool unbalanced; /* a group that no one block holds: its pushes leave a couple, or
                        one main of several pushes more alone */
    double design_thrust; /* N, factored, of the governing case and sense; over its
                             increase where soil bears it */
    kent_other_way other_ways[KENT_OTHER_WAYS]; /* the largest load first */
    size_t other_way_count;
    double factor_asked, factor_reached, utilisation; /* NAN where not held */
    kent_block block;
    kent_straps straps;       /* of a block that holds something down */
    kent_stability stability; /* of the block; nothing judged without one */
    kent_concrete_check concrete;
    kent_quantities quantities; /* nil without a block */
    double allowable_bearing; /* Pa, of a face at this depth; NAN: none, or not known */
    kent_bearing_view bearing; /* by every way that the soil states */
    kent_leg legs[KENT_PORTS];
    size_t leg_count;         /* 0: no restrained length can be given */
    double restrained_length; /* m, longest leg; NAN */
    double joints_use;        /* of the legs, that hold it; NAN */
    kent_either either;
    kent_as_built
        as_built; /* what it reaches as it was built; nothing is stated: nil */
    kent_footprint footprint; /* what it takes up of the ground */
    kent_notes cautions;      /* of this fitting; says what would help where not held */
    kent_notes remarks;       /* why no length stands beside what holds it, and what is
                                 not counted on: for its hand calculation alone */
    kent_derivation derivation; /* every step */
} kent_holding;

typedef struct kent_restraints {
    kent_holding *fittings; /* [fitting_count] */
    size_t fitting_count;
    double concrete;            /* m3 in all, faces of their own included */
    kent_quantities quantities; /* in all */
    double age; /* s, of the concrete before a test: the greatest of all blocks; 0: no
                   block; NAN: never strong enough */
    size_t not_held;  /* of those that should be: not where none was asked or needed */
    kent_space space; /* who is near whom */
    kent_systems systems; /* of fittings held by restrained joints */
    kent_notes cautions;  /* of all the blocks together */
    kent_pulls pulls;     /* along pipes */
} kent_restraints;

kent_status kent_restraint_size(const kent_model *m, const kent_loads_result *loads,
                                kent_restraints **out, kent_error *err);
void kent_restraints_free(kent_restraints *r);

const char *kent_block_word(kent_block_type type);
const char *kent_leg_end_word(kent_leg_end end); /* "in-ground", "structure" ... */

#endif
