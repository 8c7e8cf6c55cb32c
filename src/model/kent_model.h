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
    kent_vec3 at;         /* m; x, y NAN where not given; z the pipe's centre line */
    double cover;         /* m, ground to crown; NAN: the ground's */
    double ground_level;  /* m, in place of cover; NAN */
    double water_table;   /* m below ground; NAN: the ground's; INFINITY: none */
    double station;       /* m; NAN: worked out along the route */
    double station_ahead; /* m, station equation: counted on from here; NAN: none */
    double turn;          /* rad in plan, + to the left, where x, y are NAN; NAN */
    double curve_radius;  /* m, of the arc that the pipe follows here; NAN: none */
    int soil;             /* -1: the ground's */
    bool record;          /* its history is wanted */
    bool laid_out;        /* derived: x, y are worked out from stations and turns */
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
    double branch_turn;      /* rad in plan, + to the left: its start against the pipe
                                that runs there, where x, y are NAN; NAN */
    double pressure_rating;  /* Pa, in service, as rated; NAN */
    double surge_rating;     /* Pa, service and surge together; NAN */
    double recurring_rating; /* Pa, the same where the surge recurs; NAN */
    double test_rating;      /* Pa, under the site test; NAN */
    double joint_rating;     /* Pa, of its joints, in every case; NAN */
    bool plastic;            /* its material creeps, and tires */
    bool above_ground;       /* laid on supports: no ground holds it */
    double nominal_size;     /* m, that its class is called by; NAN */
    double expansion;        /* 1/K of length, of its material; NAN */
    double long_modulus;     /* Pa, of a plastic under lasting load; NAN: modulus */
    double derating;         /* of a plastic by temperature, on every rating; 1: none */
    size_t creep_first, creep_count; /* into kent_model.creep; 0: elastic */
    kent_place place;
} kent_pipe;

/* One Kelvin-Voigt element of a plastic wall. */
typedef struct kent_creep {
    double time;       /* s, of retardation */
    double compliance; /* 1/Pa */
} kent_creep;

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

/* ---- devices. Their fields bear the names of the case's keys. A device stands in line
 * where two pipes meet at its point, discharges where one ends there, or stands beside
 * the point; beside an in-line device it is on the side of the next point `next_to`. */

typedef enum kent_check_kind {
    KENT_CHECK_NONE,
    KENT_CHECK_IDEAL,  /* shuts as the flow reverses */
    KENT_CHECK_DELAYED /* stays open for `delay` after the flow first reverses */
} kent_check_kind;

/* Units of one kind side by side, each with a check valve behind it or none. */
typedef struct kent_pump {
    char id[KENT_ID];
    int point;
    int flow_to;           /* the next point in flow direction, of one in line; -1 */
    double suction_level;  /* m, that one at a pipe's end draws from; NAN in line */
    int in_parallel;       /* units */
    int running;           /* of them in the steady state */
    kent_pump_curve curve; /* of one unit at its rated speed */
    double inertia;        /* kg m2 of one unit: pump with water, motor, flywheel */
    bool inertia_estimated;
    kent_check_kind check_valve;
    double check_delay; /* s: key check_valve_delay */
    double check_loss;  /* s2/m5 of one unit's check valve when open; 0: none */
    double check_size;  /* m; NAN: not given */
    int node[2];        /* derived: [0] suction (-1: the suction level), [1] delivery */
    kent_place place;
} kent_pump;

typedef struct kent_check_valve { /* in line */
    char id[KENT_ID];
    int point, flow_to;
    double size;  /* m */
    double loss;  /* K on its size when open */
    double delay; /* s from first reversal to closure */
    int node[2];  /* derived: flow from [0] to [1] */
    kent_place place;
} kent_check_valve;

typedef enum kent_holds {
    KENT_HOLDS_DOWNSTREAM, /* reduces: at most set_pressure behind it */
    KENT_HOLDS_UPSTREAM    /* sustains: at least set_pressure before it */
} kent_holds;

typedef struct kent_control_valve { /* in line; lets nothing back */
    char id[KENT_ID];
    int point, flow_to;
    kent_holds holds;
    double set_pressure;               /* Pa, at the point's level */
    double size;                       /* m */
    double capacity;                   /* m^2.5/s at full opening */
    double opening_time, closure_time; /* s for the whole stroke */
    int node[2];
    kent_place place;
} kent_control_valve;

typedef struct kent_surge_tank { /* open to the air; its level in the steady state is
                                    the head there */
    char id[KENT_ID];
    int point, next_to;
    double area;           /* m2 of its surface */
    double bottom_level;   /* m; below it air would enter: the run stops saying so */
    double overflow_level; /* m; INFINITY: none */
    double connection_diameter; /* m, that the losses are on */
    double loss_in, loss_out;   /* K into the tank, out of it */
    int node;
    kent_place place;
} kent_surge_tank;

typedef struct kent_one_way_tank { /* feeds the main when the head falls below level */
    char id[KENT_ID];
    int point, next_to;
    double area;         /* m2 */
    double level;        /* m, when nothing happens */
    double bottom_level; /* m; empty there; -INFINITY: never */
    double connection_diameter;
    double loss_out; /* K */
    int node;
    kent_place place;
} kent_one_way_tank;

typedef struct kent_air_vessel {
    char id[KENT_ID];
    int point, next_to;
    double total_volume, gas_volume; /* m3; the gas in the steady state */
    double polytropic_exponent;
    double water_level; /* m, in the steady state; NAN: the point's */
    double area;        /* m2 in plan, by which the level moves; INFINITY: it doesn't */
    double connection_diameter;
    double loss_in, loss_out; /* K into the vessel, out of it */
    int node;
    kent_place place;
} kent_air_vessel;

typedef struct kent_relief_valve {
    char id[KENT_ID];
    int point, next_to;
    double set_pressure, full_open_pressure; /* Pa, at the point's level */
    double low_set_pressure; /* Pa: a fall below it opens it too, before the surge
                                returns; NAN: it does not anticipate */
    double hold_time;        /* s that it then stays open */
    double size;             /* m */
    double capacity;         /* m^2.5/s at full opening */
    double opening_time, closure_time; /* s for the whole stroke */
    double discharge_level;            /* m; the point's where not given */
    int node;
    kent_place place;
} kent_relief_valve;

typedef struct kent_air_valve {
    char id[KENT_ID];
    int point, next_to;
    int in_parallel;
    double admission_orifice, release_orifice; /* m, diameters */
    double admission_coefficient, release_coefficient;
    double switch_pressure;  /* Pa inside at which release goes over to ... */
    double switched_orifice; /* m: this one, of a non-slam valve; NAN: none */
    int node;
    kent_place place;
} kent_air_valve;

/* Where some scenario breaks the pipe: a hole to the air, shut until then. */
typedef struct kent_burst {
    int point;
    int node;
    kent_place place;
} kent_burst;

typedef enum kent_device_kind {
    KENT_DEVICE_PUMP,
    KENT_DEVICE_CHECK_VALVE,
    KENT_DEVICE_CONTROL_VALVE,
    KENT_DEVICE_SURGE_TANK,
    KENT_DEVICE_ONE_WAY_TANK,
    KENT_DEVICE_AIR_VESSEL,
    KENT_DEVICE_RELIEF_VALVE,
    KENT_DEVICE_AIR_VALVE,
    KENT_DEVICE_BURST,
    KENT_DEVICE_KINDS
} kent_device_kind;

/* Derived: one device of those above, for whoever treats them alike. In line: water
 * flows from node[0] to node[1]; a pump that draws from a suction level has node[0] -1.
 * Beside a point: node[0], and node[1] -1; flow is positive out of the main. */
typedef struct kent_device {
    kent_device_kind kind;
    int index; /* into the model's array of that kind */
    int point;
    int node[2];
    const char *id; /* its own; a burst's is its point's */
} kent_device;

/* Pumps, check and control valves; the others stand beside a point. */
bool kent_device_in_line(kent_device_kind kind);

typedef enum kent_event_kind {
    KENT_EVENT_VALVE,
    KENT_EVENT_OUTFLOW,
    KENT_EVENT_PUMP,
    KENT_EVENT_FIXED_LEVEL,
    KENT_EVENT_BURST
} kent_event_kind;

typedef enum kent_action {
    KENT_TRIP,  /* power is lost: the speed follows from inertia and torque */
    KENT_START, /* from standstill to rated speed in ramp_time */
    KENT_STOP,  /* to standstill in ramp_time */
    KENT_RAMP   /* to a share `to` of the rated speed in ramp_time */
} kent_action;

typedef struct kent_event {
    kent_event_kind kind;
    int target;         /* index of the valve, outflow, pump, fixed level or burst */
    kent_action action; /* of a pump */
    int how_many;       /* units; 0: all that run, or to start: all that stand */
    double start_time;  /* s */
    double ramp_time;   /* s; NAN where a law is given, and of a trip */
    double to; /* opening, flow in m3/s, share of the rated speed, area of a burst in
                  m2; NAN where a law is given */
    double coefficient;          /* of discharge, of a burst */
    double period;               /* s after which a law begins again; NAN: never */
    size_t law_first, law_count; /* into kent_model.law; count 0: the ramp */
    kent_place place;
} kent_event;

typedef struct kent_law_point {
    double time;  /* s after start_time */
    double value; /* opening, flow m3/s, or level m */
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
    size_t event_first, event_count;     /* into kent_model.events */
    size_t state_first, state_count;     /* into kent_model.scenario_states; 0: all */
    size_t without_first, without_count; /* into kent_model.without */
    int same_as;         /* scenario whose events it repeats, to be set beside it; -1 */
    bool for_comparison; /* it decides no load case and no limit */
    double cycles_per_day; /* how often pressure swings so; NAN */
    kent_place place;
} kent_scenario;

/* What the case asks for beyond the ratings of pipes and fittings. Pa gauge, NAN:
 * nobody asks. */
typedef struct kent_asked {
    double lowest_steady;
    double lowest[3]; /* by kent_class: lowest_recurring ... */
    double life;      /* s that the main is to serve; NAN */
} kent_asked;

typedef struct kent_state_level {
    int fixed_level; /* index of the one that stands otherwise */
    double level;    /* m above datum */
} kent_state_level;

/* A device by its array, before kent_model.devices is derived. */
typedef struct kent_left_out {
    kent_device_kind kind;
    int index;
} kent_left_out;

typedef struct kent_state_running {
    int pump;
    int running; /* units */
} kent_state_running;

/* A steady flow that scenarios may start from. A case without states has one,
 * "normal". */
typedef struct kent_state {
    char id[KENT_ID];
    size_t level_first, level_count;     /* into kent_model.state_levels */
    size_t running_first, running_count; /* into kent_model.state_running */
    double outflow_factor;               /* on every outflow */
    double roughness_factor; /* on roughness, n and f; Hazen-Williams' C is divided */
    kent_place place;
} kent_state;

/* How the horizontal bearing of a soil is known. */
typedef enum kent_bearing_route {
    KENT_BEARING_CONSTANT, /* one presumptive value */
    KENT_BEARING_BY_DEPTH, /* a table by depth */
    KENT_BEARING_GRADIENT, /* so much per metre of depth */
    KENT_BEARING_PASSIVE   /* a share of the passive earth pressure */
} kent_bearing_route;

enum { KENT_DEPTH_ROWS = 8, KENT_TRENCHES = 5 };

/* What ground is. All but natural ground hold nothing unless made good, each in a way
 * of its own. */
typedef enum kent_nature {
    KENT_NATURAL,
    KENT_FILL, /* not compacted under control */
    KENT_ORGANIC,
    KENT_EXPANSIVE,
    KENT_LIQUEFIABLE,
    KENT_COLLAPSIBLE /* gives way once wetted */
} kent_nature;

typedef struct kent_depth_row {
    double depth;   /* m, ground to the centre of the face */
    double bearing; /* Pa */
} kent_depth_row;

typedef struct kent_soil {
    char id[KENT_ID];
    char source[200]; /* "given in the case", or the catalogue row's source */
    kent_bearing_route route;
    double allowable_bearing; /* Pa, horizontal; 0: none can be relied on; NAN where
                                 another route gives it */
    kent_depth_row by_depth[KENT_DEPTH_ROWS]; /* [by_depth_count] depth rising */
    size_t by_depth_count;
    double bearing_gradient; /* Pa/m of depth; NAN */
    double passive_share; /* of the passive pressure that a block may count on; NAN */
    double factor_inside; /* >= 1: a factor already inside the bearing */
    double vertical_bearing; /* Pa, under a base; NAN: allowable_bearing */
    double base_friction;    /* concrete on soil, coefficient; NAN */
    double base_cohesion;    /* Pa, concrete on soil, in place of base_friction; NAN */
    double wall_friction; /* rad, of soil on a face: Coulomb's passive pressure in place
                             of Rankine's; NAN */
    kent_nature nature;
    double passive_by_trench[KENT_TRENCHES]; /* passive_ratio by kind of trench; NAN */
    double unit_weight;                      /* N/m3; NAN */
    double friction_angle;                   /* rad; NAN */
    double cohesion;                         /* Pa; NAN */
    double friction_ratio; /* pipe-soil friction angle over friction angle; NAN */
    double adhesion_ratio; /* pipe-soil adhesion over cohesion; NAN */
    double passive_ratio;  /* share of the passive pressure mobilised, Kn; NAN */
    bool unreliable;       /* peat, fill: no restraint may count on it */
    kent_place place;
} kent_soil;

typedef struct kent_ground { /* the defaults of every point */
    int soil;                /* -1: none stated */
    double cover;            /* m; NAN: none stated */
    double water_table;      /* m below ground; INFINITY: none */
    bool wrapped;            /* pipes are in polyethylene sleeves */
    int trench;              /* 0 .. KENT_TRENCHES - 1: "type-1" ...; -1: not stated */
    int backfill; /* soil that the trench is filled with, which rubs on the pipe; -1: as
                     the ground, which alone bears */
} kent_ground;

/* Ground along part of a pipe; what a zone leaves out, ground says. */
typedef struct kent_ground_zone {
    int pipe;
    double from, to;    /* m, stations along the pipe; from < to */
    int soil;           /* -1 */
    double cover;       /* m; NAN */
    double water_table; /* m below ground; NAN; INFINITY: none */
    int trench;         /* -1 */
    int backfill;       /* -1 */
    bool casing;        /* the pipe runs in a casing: nothing holds it there */
    kent_place place;
} kent_ground_zone;

/* Something near a fitting that soil must not be leant on through. */
typedef struct kent_obstacle {
    char what[64];
    kent_vec3 direction; /* unit, from the fitting's centre */
    double distance;     /* m, level, from the fitting's centre to its near side */
    double depth;        /* m, ground to its underside */
} kent_obstacle;

/* How the test pressure is found. */
typedef enum kent_test_rule {
    KENT_TEST_FIXED,            /* test_pressure itself */
    KENT_TEST_EN805_CALCULATED, /* with the surge computed */
    KENT_TEST_EN805_ASSUMED,    /* with an assumed allowance for surge */
    KENT_TEST_C600,             /* multiples of the working pressure, two places */
    KENT_TEST_FACTOR            /* test_factor on the working pressure */
} kent_test_rule;

/* On which diameter the pressure of a leg acts where a joint can slip. */
typedef enum kent_thrust_area {
    KENT_AREA_OUTSIDE, /* of the pipe, as the seal of its joint */
    KENT_AREA_INSIDE,  /* its bore */
    KENT_AREA_NOMINAL  /* the size its class is called by */
} kent_thrust_area;

/* A load case that a case says it does without, and why. */
typedef struct kent_waiver {
    char what[16]; /* "test", "static", "shut-off" or "surge" */
    char reason[160];
    kent_place place;
} kent_waiver;

typedef struct kent_loads {
    kent_test_rule test_rule;
    double test_pressure;       /* Pa, of KENT_TEST_FIXED; NAN: no test case */
    int test_gauge;             /* point where it is read; -1 */
    double test_factor;         /* of KENT_TEST_FACTOR */
    double surge_allowance;     /* Pa, of KENT_TEST_EN805_ASSUMED */
    double static_level;        /* m; NAN: the highest connected level of any state */
    double future_pressure;     /* Pa; NAN: none */
    int future_gauge;           /* point where it is read; -1 */
    double factor[8];           /* by kent_case_kind; NAN: the rules' safety factor */
    double bearing_increase[8]; /* by kent_case_kind: >= 1, on what soil may bear in
                                   cases of that kind; only as the case states; else 1
                                 */
    kent_thrust_area thrust_area;
    double cooling; /* K that a fused or welded main may cool below its temperature when
                       it was closed; NAN */
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

/* Whether a set of rules lets blocks be built. */
typedef enum kent_block_policy {
    KENT_BLOCKS_ALLOWED,
    KENT_BLOCKS_FORBIDDEN,
    KENT_BLOCKS_ON_OLD_MAINS, /* only where a new main joins one that lay before */
    KENT_BLOCKS_WITH_JOINTS   /* only together with restrained joints, each for all */
} kent_block_policy;

/* How a block's thickness is found. */
typedef enum kent_spread {
    KENT_SPREAD_45,      /* the thrust spreads within 45 degrees */
    KENT_SPREAD_CONCRETE /* or wider, where plain concrete bends and shears so far */
} kent_spread;

typedef enum kent_concrete_code {
    KENT_EN_1992, /* EN 1992-1-1:2004, section 12 and 6.7 */
    KENT_ACI_318  /* ACI 318-19, chapters 14 and 22.8 */
} kent_concrete_code;

/* Which published form gives restrained lengths; both are worked out. */
typedef enum kent_length_form {
    KENT_FORM_HANDBOOK, /* iron-pipe handbooks */
    KENT_FORM_ETL       /* USACE ETL 1110-3-446 */
} kent_length_form;

/* Design rules: one named set of config/rules.cfg, each value overridable by the case.
 */
typedef struct kent_rules {
    char id[KENT_ID];
    char source[200];
    double safety_factor;
    char soils[16];              /* last word of the ids of soils that safety_factor
                                    is meant for; "": any */
    double factor_test;          /* in place of safety_factor under test; NAN */
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

    /* of all that follow 0 is: not asked, not limited, not counted */
    kent_block_policy blocks;          /* whether blocks may be built at all */
    kent_block_policy vertical_blocks; /* and under an upward thrust */
    double largest_thrust; /* N, factored, beyond which the concrete must be designed */
    double height_over_diameter; /* m: a block is taller than the pipe by so much */
    double concrete_behind;      /* m: least between fitting and face */
    double large_diameter, large_least_cover; /* m: from that outside diameter on, the
                                                 least cover is this */
    double steepest_ground; /* rad: no block where the ground before it falls more */
    double steepest_pipe;   /* rise over run: a main steeper than this wants anchors */
    bool soil_above; /* the prism of soil above a gravity block counts as weight */
    kent_spread spread;
    kent_concrete_code concrete_code;
    double strength_before_test; /* Pa, that concrete must have before the test */
    double least_age;            /* s, from casting to the test */
    double factor_sliding, factor_overturning, factor_flotation; /* asked of blocks */
    double factor_stability_test; /* in place of the first two under test */
    double strap_stress;          /* Pa, that straps and rods may be pulled to */
    double strap_bond;            /* Pa, between rod and concrete */
    double strap_diameter;        /* m, least */
    kent_length_form length_form; /* that restrained lengths are taken from */
    double run_share; /* of the bearing of a tee's restrained run, that counts */
} kent_rules;

typedef enum kent_surge_friction {
    KENT_SURGE_NONE,
    KENT_SURGE_CONSTANT,
    KENT_SURGE_QUASI_STEADY,
    KENT_SURGE_UNSTEADY /* quasi-steady, and what it remembers of past accelerations */
} kent_surge_friction;

typedef enum kent_separation {
    KENT_SEPARATION_NONE,
    KENT_SEPARATION_VAPOUR, /* discrete vapour cavities */
    KENT_SEPARATION_GAS     /* discrete gas cavities */
} kent_separation;

typedef struct kent_solver {
    kent_surge_friction friction;
    kent_separation column_separation;
    bool creep; /* plastic walls creep by their material's elements */
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
    KENT_STRAIGHT, /* nothing turns, changes or ends: listed for its ports only */
    KENT_CURVE,    /* the pipe itself bends, or its joints one after another */
    KENT_GROUP     /* several fittings treated as one */
} kent_fitting_type;

/* What a fitting serves; its forces are those of its type. */
typedef enum kent_role {
    KENT_ROLE_NONE,
    KENT_ROLE_TAPPING, /* a sleeve on a main that was there before */
    KENT_ROLE_HYDRANT,
    KENT_ROLE_AIR_VALVE,
    KENT_ROLE_WASHOUT,
    KENT_ROLE_MANHOLE,
    KENT_ROLE_WALL,          /* a structure that the main passes or ends in, and that
                                holds it */
    KENT_ROLE_FLANGE_ADAPTOR /* a joint that no ground pulls through: it slips */
} kent_role;

/* How a branch without a pipe ends. */
typedef enum kent_branch_end {
    KENT_BRANCH_NONE, /* there is no such branch */
    KENT_BRANCH_BLANK,
    KENT_BRANCH_VALVE,
    KENT_BRANCH_OPEN /* discharges to the air what is drawn at the point */
} kent_branch_end;

typedef struct kent_branch {
    kent_branch_end end;
    kent_vec3 direction; /* unit, out of the fitting; NAN: to the left */
    double outside_diameter, inside_diameter; /* m; inside NAN: the outside */
    kent_joint joint;
} kent_branch;

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
    KENT_BLOCK_AND_JOINTS, /* a stated share each */
    KENT_NO_RESTRAINT
} kent_restraint_choice;

/* Where pressure and flow of a leg come from. */
typedef enum kent_port_kind {
    KENT_PORT_SPAN,  /* a pipe */
    KENT_PORT_GIVEN, /* the case states them */
    KENT_PORT_STUB,  /* a dead branch: the fitting's pressure, no flow */
    KENT_PORT_OUTLET /* open to the air: no gauge pressure, what is drawn here */
} kent_port_kind;

/* One leg of a fitting, seen from its centre. */
typedef struct kent_port {
    kent_vec3 direction;    /* unit, out of the fitting */
    double inside_diameter; /* m, of the stream */
    double seal_diameter;   /* m, the pressure boundary at the first joint that slips */
    double outside_diameter; /* m, of the pipe; NAN */
    double face;             /* m, centre to port; 0: not given */
    double level;            /* m, of its own where the fitting is a group; NAN */
    double momentum_factor;  /* NAN: worked out */
    /* in a network: where pressure and flow come from */
    double chainage; /* m from the span's start */
    double sign;     /* +1 where flow along the span leaves the fitting here, else -1 */
    int span;        /* -1: no pipe */
    int toward;      /* the next point along the pipe from here; -1 */
    kent_port_kind kind;
    /* ports-only */
    double pressure, flow; /* Pa gauge; m3/s out of the fitting */
} kent_port;

/* What a block's face stands against. */
typedef enum kent_backing {
    KENT_BACKING_NATURAL, /* undisturbed ground */
    KENT_BACKING_FILL     /* fill compacted under control between face and ground */
} kent_backing;

/* How the ground falls away from a fitting. */
typedef struct kent_slope {
    kent_vec3 direction; /* level, unit, downhill */
    double angle;        /* rad below the level; NAN: level ground */
} kent_slope;

/* What the engineer adds to one fitting's geometry for its restraint. */
typedef struct kent_stated {
    kent_slope slope;
    kent_backing backing;
    double block_share;   /* of the thrust that the block takes, KENT_BLOCK_AND_JOINTS;
                             NAN */
    double run_length[2]; /* m of a tee's run restrained, by port 0 and 1; NAN: none
                             credited */
    double contact_area;  /* m2 on which the fitting presses on its block; NAN */
    size_t closes_first, closes_count; /* into kent_model.closes: the next points of
                                          legs that can be shut; */
    bool closes_stated;                /* else all legs of a cross or wye can */
    char sheet[32];                    /* of the drawings that shows it; may be empty */
    char reason[160]; /* for its restraint being as it is; may be empty */
} kent_stated;

/* A restrained length of a tee's run, towards one side. */
typedef struct kent_stated_run {
    int toward;    /* the next point along the run; -1: none stated */
    double length; /* m */
} kent_stated_run;

/* What a case says of a fitting (list `fittings`). */
typedef struct kent_fitting_note {
    char id[KENT_ID]; /* of a ports-only fitting, else its point's */
    int point;        /* -1: ports-only */
    int type;         /* kent_fitting_type; -1: from geometry */
    kent_role role;
    kent_branch branch;
    size_t together_first, together_count; /* into kent_model.together: points whose
                                              fittings are held as one with this */
    bool apart;                            /* never made part of a group unasked */
    size_t obstacle_first, obstacle_count; /* into kent_model.obstacles */
    double angle;                          /* rad; NAN: from geometry */
    int orientation;                       /* kent_orientation; -1 */
    int restraint; /* kent_restraint_choice; -1: the default of its type */
    int soil;      /* -1 */
    double cover;  /* m; NAN */
    double weight; /* N; NAN */
    double face;   /* m, of every port from geometry; NAN */
    double rating; /* Pa, of its parts, as flanges are; NAN */
    double surge_rating, test_rating; /* Pa, the same with surge, under test; NAN */
    char standard[96];                /* that these are by; may be empty */
    kent_stated stated;            /* its run_length goes by ports, which run finds */
    kent_stated_run run[2];        /* as the case names its sides */
    size_t port_first, port_count; /* into kent_model.given_ports; 0: from geometry */
    kent_place place;
} kent_fitting_note;

/* Dimensions as built, for the factor they reach (list `as_built`). NAN: not given. */
typedef struct kent_built {
    char fitting[KENT_ID];
    double width, height, thickness; /* m, of the face, or of a base or gravity block:
                                        along, across or high, as in kent_block */
    double face_width, face_height, face_thickness; /* m, of a face beside those */
    double axis_above;           /* m, pipe axis over the centre of the face; 0 */
    int body;                    /* kent_block_type; -1: no block */
    size_t leg_first, leg_count; /* into kent_model.built_legs */
    kent_place place;
} kent_built;

typedef struct kent_built_leg {
    int toward;    /* the next point along that leg */
    double length; /* m restrained */
} kent_built_leg;

/* How concrete gains strength. */
typedef enum kent_cement {
    KENT_CEMENT_NORMAL,
    KENT_CEMENT_RAPID,
    KENT_CEMENT_SLOW
} kent_cement;

/* Concrete of the blocks: a row of config/concretes.cfg, or as the case says. */
typedef struct kent_concrete {
    char id[KENT_ID];
    char source[200];
    double strength; /* Pa, characteristic or specified, of a cylinder at 28 days; NAN:
                        not stated */
    kent_cement cement;
    kent_place place;
} kent_concrete;

/* Pa: strength taken where nobody states one. source docs/theory 19.1 */
double kent_concrete_usual(kent_concrete_code code);

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
    size_t stand_first, stand_count; /* into kent_model.stands: what else is here */
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
    kent_role role;
    kent_branch branch;  /* one without a pipe, direction and bore settled; a blank or
                            valve on a joint that holds has no port. end NONE: none */
    double curve_radius; /* m, of a curve; NAN */
    double curve_length; /* m along a curve; NAN */
    size_t member_first, member_count; /* of a group, or of a curve of several joints,
                                          into kent_model.members */
    bool parted; /* a group of which some member is not joined to the others by pipe
                    between them alone, and may be under pressure without them */
    size_t obstacle_first, obstacle_count; /* into kent_model.obstacles */
    int zone;     /* of kent_model.ground_zones, that it lies in; -1 */
    int trench;   /* -1: not stated */
    int backfill; /* soil; -1: as the ground */
    kent_restraint_choice restraint;
    int soil;                  /* -1: not stated */
    double cover, water_table; /* m; NAN: not stated */
    double outside_diameter;   /* m, of its largest port */
    kent_stated stated;        /* slope's angle NAN where nothing is said */
    double weight;             /* N */
    int valve;                 /* KENT_VALVE: which of valves; -1 */
    int device; /* KENT_VALVE: which of devices, where it is one of those; -1 */
    size_t port_first,
        port_count; /* into kent_model.ports. Bend and reducer: [0] upstream
                       by route; tee, wye: [0], [1] the run, [2] the branch. Group:
                       the legs that lead out of it, member by member */
    kent_place place;
} kent_fitting;

/* A march: a scenario from one steady state. */
typedef struct kent_march {
    int scenario, state;
} kent_march;

/* Who draws and checks, printed on sheets and never computed with. Empty: not given. */
typedef struct kent_project {
    char number[64], drawing[64], revision[64], designer[64], checker[64];
    char utility[64], date[32];
    char codes[240]; /* standards, with editions, that the user holds to */
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
    double barometric;  /* Pa absolute */
    double gravity;     /* m/s2 */
    double gas_content; /* free gas by volume at one atmosphere, -; 0: none */

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
    kent_pump *pumps;
    size_t pump_count;
    kent_check_valve *check_valves;
    size_t check_valve_count;
    kent_control_valve *control_valves;
    size_t control_valve_count;
    kent_surge_tank *surge_tanks;
    size_t surge_tank_count;
    kent_one_way_tank *one_way_tanks;
    size_t one_way_tank_count;
    kent_air_vessel *air_vessels;
    size_t air_vessel_count;
    kent_relief_valve *relief_valves;
    size_t relief_valve_count;
    kent_air_valve *air_valves;
    size_t air_valve_count;
    kent_burst *bursts; /* one for each point that an event breaks */
    size_t burst_count;
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
    kent_asked asked; /* group `limits` */
    kent_rules rules;
    kent_solver solver;
    kent_creep *creep;
    size_t creep_count;
    kent_state *states; /* at least one once derived */
    size_t state_count;
    kent_state_level *state_levels;
    size_t state_level_count;
    int *scenario_states; /* [scenario_state_count] */
    size_t scenario_state_count;
    kent_state_running *state_running;
    size_t state_running_count;
    kent_left_out *without; /* [without_count] devices beside the main that a scenario
                               leaves out */
    size_t without_count;
    kent_ground_zone *ground_zones;
    size_t ground_zone_count;
    kent_obstacle *obstacles;
    size_t obstacle_count;
    int *together; /* [together_count] points */
    size_t together_count;
    int *closes; /* [closes_count] points */
    size_t closes_count;
    kent_built *built;
    size_t built_count;
    kent_built_leg *built_legs;
    size_t built_leg_count;
    kent_waiver *waivers;
    size_t waiver_count;
    kent_concrete concrete;
    kent_notes assumed; /* "what\tvalue\twhy": what nobody gave */
    kent_notes cautions;

    /* derived */
    double
        *chainage; /* [route_count] m from the pipe's start, by its hydraulic length */
    double *station;    /* [route_count] m, as counted along the pipe up to the point */
    double *station_on; /* [route_count] m, what counting goes on from there */
    size_t *zone_first; /* [pipe_count + 1] into zone_order */
    int *zone_order;    /* [ground_zone_count] zones grouped by pipe, by where they
                           start */
    kent_span *spans;
    size_t span_count;
    kent_node *nodes;
    size_t node_count;
    kent_end *ends;       /* [2 span_count], grouped by node */
    kent_device *devices; /* [device_count] by kind, then as the case lists them */
    size_t device_count;
    int *stands; /* [stand_count] into devices, grouped by node; an in-line one twice */
    size_t stand_count;
    kent_port *ports;
    size_t port_count;
    kent_fitting *fittings; /* by route and station, ports-only last */
    size_t fitting_count;
    int *members; /* [member_count] points of grouped fittings */
    size_t member_count;
    kent_march *marches; /* [march_count] by scenario, then state: what is marched */
    size_t march_count;
    double *highest_level;  /* [node_count] m: of all fixed levels in all states that it
                               is connected to with every valve open; NAN: none */
    double *shut_off_level; /* [node_count] m: that pumps raise still water to, valves
                               shut behind it; NAN: none reaches it, or it is a fixed
                               level */
} kent_model;

/* With nothing given: NAN, -1, no branch, no derating, every bearing by one value. */
kent_point kent_point_blank(void);
kent_pipe kent_pipe_blank(void);
kent_soil kent_soil_blank(void);
kent_fitting_note kent_note_blank(void);
kent_port kent_port_blank(void);

/* m: the diameter that the pressure acts on at a joint that slips, as loads.thrust_area
 * says: the outside, else the bore or the nominal size where that is asked for. inside
 * where outside is not known (NAN), outside where nominal is not. source 8.2 */
double kent_seal_diameter(const kent_model *m, double outside, double inside,
                          double nominal);

kent_stated kent_stated_blank(void);
kent_built kent_built_blank(void);

kent_model *kent_model_new(void); /* empty, with every default set; NULL: no memory */
void kent_model_free(kent_model *m);

/* Works out the derived part. What geometry or network make impossible goes to
 * complaints with file and line: a pipe without length, a device where it cannot stand,
 * a part cut off from every fixed level (its points are named). Returns KENT_OK,
 * KENT_E_INPUT (complaints were added) or KENT_E_NOMEM. */
kent_status kent_model_derive(kent_model *m, kent_complaints *complaints);

/* The main in one of its states: shares everything with m, which must outlive it, but
 * the levels, outflows, running pumps and friction that the state changes. capacity
 * [valve_count]: what valves with a stated flow were found to pass in the first state;
 * NULL: not known yet. Free it with kent_model_view_free alone. NULL: no memory. */
kent_model *kent_model_in_state(const kent_model *m, int state, const double *capacity);
void kent_model_view_free(kent_model *view);

/* ---- variations ------------------------------------------------------------------ */

/* What is moved to see how much a design hangs on it. */
typedef enum kent_vary {
    KENT_VARY_WAVE_SPEED,  /* of every pipe */
    KENT_VARY_INERTIA,     /* of every pump */
    KENT_VARY_CHECK_DELAY, /* of pumps' check valves and those in line */
    KENT_VARY_AIR_VALVES,  /* coefficients of admission and release */
    KENT_VARY_EVENT_TIME,  /* how long every event takes but those of fixed levels, and
                              laws that begin again */
    KENT_VARIES
} kent_vary;

typedef struct kent_variation {
    kent_vary what;
    bool more;     /* the larger value of the two */
    double factor; /* on what it is in the case */
} kent_variation;

/* s: what an ideal check valve is given where delays are varied upwards. */
#define KENT_VARY_IDEAL_DELAY 0.5

/* The two that belong to each: 0.9 and 1.1 of wave speeds, 0.5 and 1.5 of inertia, no
 * delay and twice of check valves, 0.75 and 1.25 of air valves, 0.8 and 1.2 of times.
 * Common practice, no source. */
kent_variation kent_variation_of(kent_vary what, bool more);
const char *kent_vary_word(kent_vary what); /* "wave speed" ... */

/* Whether it can move any result of m: not an inertia where no scenario trips a pump.
 */
bool kent_variation_tells(const kent_model *m, kent_variation v);

/* The main with one thing moved: shares all else with m, which must outlive it. A
 * scenario lasts as much longer as its last event does. Free it with
 * kent_model_varied_free alone. NULL: no memory. */
kent_model *kent_model_varied(const kent_model *m, kent_variation v);
void kent_model_varied_free(kent_model *view);

/* ---- asking a model -------------------------------------------------------------- */

/* Whether a scenario (-1: none) leaves a device out. */
bool kent_device_is_left_out(const kent_model *m, size_t device, int scenario);

/* What something is called in a state: "shut-16s (low)"; in a case of one state, or of
 * none in particular (-1), its name alone. */
typedef struct kent_name {
    char s[2 * KENT_ID + 20];
} kent_name;
kent_name kent_name_in_state(const kent_model *m, const char *name, int state);

/* What a device is called in results: its id, or "K2.burst", since a burst has only its
 * point's. */
kent_name kent_device_name(const kent_model *m, size_t device);

/* What files of a march are called after: "shut-16s", and "shut-16s-low" where that
 * scenario starts from several states. No two marches share one. */
kent_name kent_march_file_name(const kent_model *m, kent_march march);

/* Whether indices are in range, spans and nodes fit each other, and every SI value that
 * must be positive is. For assertions and tests. */
bool kent_model_is_valid(const kent_model *m);

/* m: level of the pipe's centre line at a chainage of a span. */
double kent_span_level(const kent_model *m, const kent_span *span, double chainage);

/* Pa absolute, at the middle of a span with all water at rest under the highest fixed
 * level; barometric above it. And what the water there is with the case's free gas: the
 * water itself where there is none. */
double kent_span_still_pressure(const kent_model *m, const kent_span *span);
kent_mixture kent_span_mixture(const kent_model *m, const kent_span *span);

/* Head loss along a whole span (m, sign of the flow: friction and spread minor losses),
 * and its derivative with respect to flow. The surge's reaches add up to the same. */
double kent_span_loss(const kent_model *m, const kent_span *span, double flow,
                      double *derivative);

/* The ground around a pipe at one place along it. */
typedef struct kent_ground_here {
    int soil;     /* -1: not stated */
    int trench;   /* -1: not stated */
    int zone;     /* of kent_model.ground_zones; -1: in none */
    int backfill; /* soil; -1: as the ground */
    bool casing;
    double cover, water_table; /* m; NAN: not stated; INFINITY: no water */
} kent_ground_here;

/* chainage m from the pipe's start, 0 .. its length. What the zone there leaves out, or
 * where there is none, the ground's defaults say; cover first of all lies in a straight
 * line between neighbouring points that both have one. What single points say of soil
 * and water is theirs alone. */
kent_ground_here kent_model_ground_at(const kent_model *m, int pipe, double chainage);

/* Whether a KENT_VALVE may be shut with pressure on the side of one of its ports: what
 * lets nothing back holds it on its delivery side alone. */
bool kent_fitting_shuts(const kent_model *m, const kent_fitting *f, size_t port);

/* m: ground to crown of a pipe of that outside diameter; NAN: the point has none. */
double kent_point_cover(const kent_point *point, double outside_diameter);

/* m: station at a chainage of a pipe, counted from the last point before it. */
double kent_model_station_at(const kent_model *m, int pipe, double chainage);

/* m: level of the water at a node where nothing flows: the one stated, else the highest
 * connected level of any state. NAN: none. */
double kent_static_level(const kent_model *m, int node);

/* m: level that pumps at no flow raise the water of a span to, each on what it draws
 * from (9.15). NAN: none reaches it. */
double kent_shut_off_level(const kent_model *m, int span);

/* Pa gauge, from a piezometric head (m) at a level (m). */
double kent_model_pressure(const kent_model *m, double head, double level);

/* "mains.cfg:42" of a place; empty where nothing is known. */
void kent_model_place_text(const kent_model *m, kent_place place, char *out,
                           size_t size);

/* Index, or -1. */
int kent_model_point_index(const kent_model *m, const char *id);
int kent_model_pipe_index(const kent_model *m, const char *id);
int kent_model_valve_index(const kent_model *m, const char *id);
int kent_model_device_index(const kent_model *m, const char *id); /* into devices */
/* By its own id, else by that of one of its members. */
int kent_model_fitting_of(const kent_model *m, const char *id);

kent_place kent_device_place(const kent_model *m, const kent_device *d);

/* Words as in the case file and in results: "bend", "dead-end", "push-on" ... */
const char *kent_fitting_type_word(kent_fitting_type type);
const char *kent_role_word(kent_role role); /* "tapping-tee" ...; "": none */
bool kent_role_on_run(kent_role role);      /* a piece of the main itself, no branch */
const char *kent_branch_end_word(kent_branch_end end);
const char *kent_trench_word(int trench); /* "type-1" ...; "" for -1 */
const char *kent_orientation_word(kent_orientation orientation);
const char *kent_joint_word(kent_joint joint);
const char *kent_class_word(kent_class class_of);
const char *kent_device_word(kent_device_kind kind); /* "air vessel" ... */
const char *kent_restraint_word(kent_restraint_choice restraint);
const char *kent_nature_word(kent_nature nature); /* "natural", "fill" ... */
const char *kent_backing_word(kent_backing backing);
const char *kent_block_policy_word(kent_block_policy policy);
const char *kent_spread_word(kent_spread spread);
const char *kent_concrete_code_word(kent_concrete_code code);
const char *kent_length_form_word(kent_length_form form);
const char *kent_friction_word(kent_friction_law law);
const char *kent_axial_support_word(kent_axial_support support);

/* What a pipe is rated for. */
typedef enum kent_rating {
    KENT_RATING_SERVICE,
    KENT_RATING_SURGE,     /* service and surge together */
    KENT_RATING_RECURRING, /* the same, in a scenario that recurs */
    KENT_RATING_TEST,      /* the site test */
    KENT_RATINGS
} kent_rating;

/* Pa gauge, at the water's temperature; with surge that recurs that with any surge, and
 * with surge that of service, where no other is known. NAN: not known. */
double kent_pipe_rating(const kent_pipe *p, kent_rating rating);

/* Whether a joint can slip apart under thrust. */
bool kent_joint_slips(kent_joint joint);

#endif
