/* A main as the solvers see it: plain SI arrays with integer indices; ids are for
 * people.
 *
 * Two layers. The *given* part is what a case states: points, pipes, devices,
 * scenarios, ground, loads, notes on fittings. The *derived* part (spans, nodes, ports,
 * fittings) is worked out from it once, by kent_model_derive; after that nothing
 * changes a model.
 *
 * Index -1 is "none", NAN is "not given", in every field that says it may be. The model
 * owns every array; kent_model_free frees them all. */
#ifndef KENT_MODEL_H
#define KENT_MODEL_H

#include "kent_base.h"
#include "kent_hydro.h"
#include "kent_units.h"

#include <stdbool.h>
#include <stddef.h>

enum { KENT_ID = 48 };

/* Where in the input something was said. */
typedef struct kent_place {
    int file; /* index into kent_model.files; -1: nowhere */
    int line;
} kent_place;

/* ---- given ----------------------------------------------------------------------- */

typedef struct kent_point {
    char id[KENT_ID];
    kent_vec3 at;       /* m; x, y NAN where not given; z the pipe's centre line */
    double cover;       /* m, ground to crown; NAN: the ground's */
    double water_table; /* m below ground; NAN: the ground's; INFINITY: none */
    double station;     /* m; NAN: worked out along the route */
    int soil;           /* -1: the ground's */
    bool record;        /* its history is wanted */
    kent_place place;
} kent_point;

typedef enum kent_joint {
    KENT_PUSH_ON,
    KENT_MECHANICAL,
    KENT_FLANGED,
    KENT_WELDED,
    KENT_FUSED,
    KENT_RESTRAINED
} kent_joint;

typedef struct kent_pipe {
    char id[KENT_ID];
    char pipe_class[KENT_ID];        /* of the catalogue; empty: stated outright */
    char material[KENT_ID];          /* may be empty */
    char standard[96];               /* with edition; may be empty */
    size_t route_first, route_count; /* into kent_model.route */
    double length;                   /* m, given; NAN: from coordinates */
    double inside_diameter;          /* m, inside the lining */
    double outside_diameter;         /* m */
    double wall;         /* m, nominal: wave speed; NAN where wave_speed is given */
    double wall_minimum; /* m; NAN: not known */
    double lining, lining_modulus; /* m, Pa; 0: none */
    double modulus, poisson;       /* Pa, - */
    double unit_mass; /* kg per m of pipe without water; NAN: worked out from density */
    double material_density; /* kg/m3; NAN */
    kent_friction_law friction;
    double friction_coefficient;
    double loss;       /* minor losses spread along it, K on its bore */
    double wave_speed; /* m/s, given; NAN: computed */
    kent_axial_support axial_support;
    bool thin_wall;
    kent_joint joint;
    double joint_deflection; /* rad, that a joint may take; 0 where not known */
    double laying_length;    /* m, of one pipe: key pipe_length; NAN */
    double pressure_rating;  /* Pa; NAN */
    kent_place place;
} kent_pipe;

typedef struct kent_fixed_level {
    int point;
    double level; /* m above datum */
    double
        loss; /* K on the pipe's bore, of flow out of it: it loses (1 + loss) V2/2g */
    int node; /* derived */
    kent_place place;
} kent_fixed_level;

typedef struct kent_outflow {
    int point;
    double flow; /* m3/s out of the main; negative: into it */
    bool pressure_dependent;
    double full_pressure; /* Pa, at which the whole flow is drawn */
    int node;             /* derived */
    kent_place place;
} kent_outflow;

typedef struct kent_valve {
    char id[KENT_ID];
    int point;
    char type[KENT_ID];
    kent_valve_curve curve;
    double size;            /* m */
    double capacity;        /* m^2.5/s at full opening; NAN: found from flow */
    double flow;            /* m3/s that it passes in the steady state; NAN */
    double opening;         /* 0 .. 1 in the steady state */
    double discharge_level; /* m; NAN in line */
    int node[2]; /* derived; flow positive from [0] to [1]; [1] -1: discharges */
    kent_place place;
} kent_valve;

typedef enum kent_event_kind { KENT_EVENT_VALVE, KENT_EVENT_OUTFLOW } kent_event_kind;

typedef struct kent_event {
    kent_event_kind kind;
    int target;        /* index of the valve or outflow */
    double start_time; /* s */
    double ramp_time;  /* s; NAN where a law is given */
    double to;         /* opening, or flow in m3/s; NAN where a law is given */
    size_t law_first, law_count; /* into kent_model.law; count 0: the ramp */
    kent_place place;
} kent_event;

typedef struct kent_law_point {
    double time;  /* s after start_time */
    double value; /* opening, or flow m3/s */
} kent_law_point;

typedef enum kent_class {
    KENT_RECURRING,
    KENT_OCCASIONAL,
    KENT_EXCEPTIONAL
} kent_class;

typedef struct kent_scenario {
    char id[KENT_ID];
    char title[160];
    double duration; /* s */
    kent_class class_of;
    size_t event_first, event_count; /* into kent_model.events */
    kent_place place;
} kent_scenario;

typedef struct kent_soil {
    char id[KENT_ID];
    char source[200];         /* "given in the case", or the catalogue row's source */
    double allowable_bearing; /* Pa, horizontal; 0: none can be relied on */
    double factor_inside;     /* >= 1: a factor already inside allowable_bearing */
    double vertical_bearing;  /* Pa, under a base; NAN: allowable_bearing */
    double unit_weight;       /* N/m3; NAN */
    double friction_angle;    /* rad; NAN */
    double cohesion;          /* Pa; NAN */
    double friction_ratio;    /* pipe-soil friction angle over friction angle; NAN */
    double adhesion_ratio;    /* pipe-soil adhesion over cohesion; NAN */
    double passive_ratio;     /* share of the passive pressure mobilised, Kn; NAN */
    bool unreliable;          /* peat, fill: no restraint may count on it */
    kent_place place;
} kent_soil;

typedef struct kent_ground { /* the defaults of every point */
    int soil;                /* -1: none stated */
    double cover;            /* m; NAN: none stated */
    double water_table;      /* m below ground; INFINITY: none */
    bool wrapped;            /* pipes are in polyethylene sleeves */
} kent_ground;

typedef struct kent_loads {
    double test_pressure; /* Pa; NAN: no test case */
    int test_gauge;       /* point where it is read; -1 */
    double static_level;  /* m; NAN: the highest connected level */
    double factor[8];     /* by kent_case_kind; NAN: the rules' safety factor */
    kent_place place;
} kent_loads;

/* Kinds of load case that carry a factor of their own, in the order of
 * kent_loads.factor. */
typedef enum kent_case_kind {
    KENT_CASE_TEST,
    KENT_CASE_STATIC,
    KENT_CASE_STEADY,
    KENT_CASE_SHUT_OFF,
    KENT_CASE_RECURRING,
    KENT_CASE_OCCASIONAL,
    KENT_CASE_EXCEPTIONAL,
    KENT_CASE_SUCTION
} kent_case_kind;

/* Design rules: one named set of config/rules.cfg, each value overridable by the case.
 */
typedef struct kent_rules {
    char id[KENT_ID];
    char source[200];
    double safety_factor;
    double height_to_depth;      /* block height over depth of its base, at most */
    double width_to_height[2];   /* least, most */
    double least_thickness;      /* m */
    double least_height;         /* m */
    double side_step;            /* m: sides are rounded up to multiples */
    double least_cover;          /* m: no bearing block above it */
    double concrete_unit_weight; /* N/m3 */
    double water_unit_weight;    /* N/m3, of ground water */
    double wrapped_ratio;  /* friction of a sleeved pipe over that of a bare one */
    double largest_volume; /* m3 of one block beyond which it is refused */
} kent_rules;

typedef enum kent_surge_friction {
    KENT_SURGE_NONE,
    KENT_SURGE_CONSTANT,
    KENT_SURGE_QUASI_STEADY
} kent_surge_friction;

typedef struct kent_solver {
    kent_surge_friction friction;
    bool grid_check;
    double wave_speed_tolerance; /* - */
    int min_reaches;
    double time_step; /* s; NAN: chosen */
    kent_place place; /* of time_step */
    int history_rows;
} kent_solver;

typedef enum kent_fitting_type {
    KENT_BEND,
    KENT_TEE,
    KENT_WYE,
    KENT_CROSS,
    KENT_REDUCER,
    KENT_DEAD_END,
    KENT_VALVE,
    KENT_STRAIGHT /* nothing turns, changes or ends: listed for its ports only */
} kent_fitting_type;

typedef enum kent_orientation {
    KENT_HORIZONTAL,
    KENT_CREST,   /* pushes up */
    KENT_SAG,     /* pushes down */
    KENT_COMBINED /* turns in plan and in profile */
} kent_orientation;

typedef enum kent_restraint_choice {
    KENT_THRUST_BLOCK, /* bearing, gravity or base, as the thrust asks */
    KENT_ANCHOR_BLOCK, /* a bearing block that holds from either side */
    KENT_RESTRAINED_JOINTS,
    KENT_NO_RESTRAINT
} kent_restraint_choice;

/* One leg of a fitting, seen from its centre. */
typedef struct kent_port {
    kent_vec3 direction;    /* unit, out of the fitting */
    double inside_diameter; /* m, of the stream */
    double seal_diameter;   /* m, the pressure boundary at the first joint that slips */
    double outside_diameter; /* m, of the pipe; NAN */
    double face;             /* m, centre to port; 0: not given */
    double momentum_factor;  /* NAN: worked out */
    /* in a network: where pressure and flow come from */
    int span;        /* -1: ports-only */
    double chainage; /* m from the span's start */
    double sign;     /* +1 where flow along the span leaves the fitting here, else -1 */
    bool at_end;     /* it is an end of the span, not a place along it */
    int toward;      /* the next point along the pipe from here; -1 */
    /* ports-only */
    double pressure, flow; /* Pa gauge; m3/s out of the fitting */
} kent_port;

/* What a case says of a fitting (list `fittings`). */
typedef struct kent_fitting_note {
    char id[KENT_ID]; /* of a ports-only fitting, else its point's */
    int point;        /* -1: ports-only */
    int type;         /* kent_fitting_type; -1: from geometry */
    double angle;     /* rad; NAN: from geometry */
    int orientation;  /* kent_orientation; -1 */
    int restraint;    /* kent_restraint_choice; -1: the default of its type */
    int soil;         /* -1 */
    double cover;     /* m; NAN */
    double weight;    /* N; NAN */
    double face;      /* m, of every port from geometry; NAN */
    size_t port_first, port_count; /* into kent_model.given_ports; 0: from geometry */
    kent_place place;
} kent_fitting_note;

/* ---- derived --------------------------------------------------------------------- */

/* A stretch of one pipe between two nodes: what engine and steady state know. */
typedef struct kent_span {
    char id[KENT_ID]; /* the pipe's, or "A.1" where the pipe is cut */
    int pipe;
    int node[2];                     /* at its start and end */
    size_t route_first, route_count; /* the part of kent_model.route it follows */
    double length;                   /* m */
    double bore, area;               /* m, m2 */
    double wave_speed;               /* m/s */
    double loss;                     /* its share of the pipe's minor losses, K */
    kent_friction friction;
} kent_span;

typedef struct kent_end {
    int span, side; /* side 0: the span's start, 1: its end */
} kent_end;

typedef enum kent_node_kind {
    KENT_NODE_JUNCTION, /* any number of ends, nothing drawn; one end: a dead end */
    KENT_NODE_FIXED_LEVEL,
    KENT_NODE_OUTFLOW,
    KENT_NODE_VALVE /* one side of an in-line valve, or a discharging one */
} kent_node_kind;

/* Where heads meet: a point at which spans end. A point with an in-line valve has two.
 */
typedef struct kent_node {
    int point;
    size_t end_first, end_count; /* into kent_model.ends */
    kent_node_kind kind;
    int device; /* index into fixed_levels, outflows or valves; -1 */
} kent_node;

typedef struct kent_fitting {
    char id[KENT_ID]; /* its point's, or its own */
    int point;        /* -1: ports-only */
    kent_fitting_type type;
    kent_orientation orientation;
    double
        angle; /* rad: a bend's turn in space, a branch's angle with the run; else 0 */
    double plan_turn;       /* rad, of a bend, seen from above, + to the left */
    double size;            /* m, bore of its largest port */
    double branch_size;     /* m; NAN: no branch */
    kent_vec3 at;           /* m; x, y NAN without coordinates */
    double station;         /* m along its route; NAN: ports-only */
    bool within_deflection; /* a turn that the joint takes: listed, not restrained */
    kent_restraint_choice restraint;
    int soil;                  /* -1: not stated */
    double cover, water_table; /* m; NAN: not stated */
    double outside_diameter;   /* m, of its largest port */
    double weight;             /* N */
    int valve;                 /* KENT_VALVE: which; else -1 */
    size_t port_first,
        port_count; /* into kent_model.ports. Bend and reducer: [0] upstream
                       by route; tee, wye: [0], [1] the run, [2] the branch */
    kent_place place;
} kent_fitting;

/* Who draws and checks, printed on sheets and never computed with. Empty: not given. */
typedef struct kent_project {
    char number[64], drawing[64], revision[64], designer[64], checker[64];
} kent_project;

typedef struct kent_model {
    char title[160];
    kent_project project;
    kent_system units;
    char **files; /* [file_count] names of the input files */
    size_t file_count;
    unsigned long long
        checksum; /* FNV-1a of the case file's bytes, includes in order */

    kent_water water;
    double barometric; /* Pa absolute */
    double gravity;    /* m/s2 */

    kent_point *points;
    size_t point_count;
    kent_pipe *pipes;
    size_t pipe_count;
    int *route; /* [route_count] point indices */
    size_t route_count;
    kent_fixed_level *fixed_levels;
    size_t fixed_level_count;
    kent_outflow *outflows;
    size_t outflow_count;
    kent_valve *valves;
    size_t valve_count;
    kent_scenario *scenarios;
    size_t scenario_count;
    kent_event *events;
    size_t event_count;
    kent_law_point *law;
    size_t law_count;
    kent_soil *soils;
    size_t soil_count;
    kent_fitting_note *notes;
    size_t note_count;
    kent_port *given_ports;
    size_t given_port_count;
    kent_ground ground;
    kent_loads loads;
    kent_rules rules;
    kent_solver solver;
    kent_notes assumed; /* "what\tvalue\twhy": what nobody gave */
    kent_notes cautions;

    /* derived */
    double
        *chainage; /* [route_count] m from the pipe's start, by its hydraulic length */
    kent_span *spans;
    size_t span_count;
    kent_node *nodes;
    size_t node_count;
    kent_end *ends; /* [2 span_count], grouped by node */
    kent_port *ports;
    size_t port_count;
    kent_fitting *fittings; /* by route and station, ports-only last */
    size_t fitting_count;
} kent_model;

kent_model *kent_model_new(void); /* empty, with every default set; NULL: no memory */
void kent_model_free(kent_model *m);

/* Works out the derived part. What geometry or network make impossible goes to
 * complaints with file and line: a pipe without length, a device where it cannot stand,
 * a part cut off from every fixed level (its points are named). Returns KENT_OK,
 * KENT_E_INPUT (complaints were added) or KENT_E_NOMEM. */
kent_status kent_model_derive(kent_model *m, kent_complaints *complaints);

/* Whether indices are in range, spans and nodes fit each other, and every SI value that
 * must be positive is. For assertions and tests. */
bool kent_model_is_valid(const kent_model *m);

/* m: level of the pipe's centre line at a chainage of a span. */
double kent_span_level(const kent_model *m, const kent_span *span, double chainage);

/* Head loss along a whole span (m, sign of the flow: friction and spread minor losses),
 * and its derivative with respect to flow. The surge's reaches add up to the same. */
double kent_span_loss(const kent_model *m, const kent_span *span, double flow,
                      double *derivative);

/* Pa gauge, from a piezometric head (m) at a level (m). */
double kent_model_pressure(const kent_model *m, double head, double level);

/* "mains.cfg:42" of a place; empty where nothing is known. */
void kent_model_place_text(const kent_model *m, kent_place place, char *out,
                           size_t size);

/* Index, or -1. */
int kent_model_point_index(const kent_model *m, const char *id);
int kent_model_pipe_index(const kent_model *m, const char *id);
int kent_model_valve_index(const kent_model *m, const char *id);

/* Words as in the case file and in results: "bend", "dead-end", "push-on" ... */
const char *kent_fitting_type_word(kent_fitting_type type);
const char *kent_orientation_word(kent_orientation orientation);
const char *kent_joint_word(kent_joint joint);
const char *kent_class_word(kent_class class_of);
const char *kent_restraint_word(kent_restraint_choice restraint);
const char *kent_friction_word(kent_friction_law law);
const char *kent_axial_support_word(kent_axial_support support);

/* Whether a joint can slip apart under thrust. */
bool kent_joint_slips(kent_joint joint);

#endif
