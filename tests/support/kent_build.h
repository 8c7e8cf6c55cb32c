/* Small models in memory, in few lines, for the tests of what works on a model.
 *
 *     kent_build b = kent_build_new();
 *     kent_build_point(&b, "R", 0.0, 0.0, 10.0);
 *     kent_build_point(&b, "E", 1000.0, 0.0, 0.0);
 *     int p = kent_build_pipe(&b, "A", "R E", 0.5, 1000.0);
 *     b.model->pipes[p].friction = KENT_FRICTIONLESS;
 *     kent_build_fixed_level(&b, "R", 100.0);
 *     int v = kent_build_valve(&b, "V", "E", 0.3, 0.0);
 *     int s = kent_build_scenario(&b, "shut", 20.0);
 *     kent_build_ramp(&b, s, KENT_EVENT_VALVE, v, 1.0, 5.0, 0.0);
 *     kent_build_derive(&b);
 *     ... b.model ...
 *     kent_build_clear(&b);
 *
 * Every function that adds something returns its index; b.model's arrays may move with
 * the next addition, so keep indices, not pointers. Whatever goes wrong (an unknown id,
 * no memory, a complaint of kent_model_derive) fails the running test and says why. */
#ifndef KENT_BUILD_H
#define KENT_BUILD_H

#include "kent_model.h"

enum { KENT_BUILD_LISTS = 24 };

typedef struct kent_build {
    kent_model *model;
    kent_complaints complaints;        /* of the last derive */
    size_t capacity[KENT_BUILD_LISTS]; /* of the model's lists */
} kent_build;

/* An empty model: water of 1000 kg/m3, 2.2e9 Pa, 1.0e-6 m2/s at 288.15 K, gravity
 * 9.80665 m/s2, barometric 101325 Pa, one file "built.cfg", no ground stated; the water
 * never parts. Rules
 * (common practice, no source): factor 1.5, height at most half the depth to the base,
 * width 1 .. 2 heights, thickness and height at least 0.3 m, sides in 0.05 m, cover at
 * least 0.6 m, concrete 23 kN/m3, sleeved pipe 0.7, at most 30 m3. */
kent_build kent_build_new(void);
void kent_build_clear(kent_build *b);

/* x, y NAN: without coordinates. m. Its line in "built.cfg" is its index + 1. */
int kent_build_point(kent_build *b, const char *id, double x, double y, double z);

/* A push-on pipe through the points named in route ("R P1 E"): bore m, no lining, wall
 * 10 mm (so outside diameter = bore + 20 mm), frictionless, wave speed given (m/s; NAN:
 * from the wall, 170 GPa, 0.28), length from coordinates. Change what else is wanted in
 * b->model->pipes[index]. Its line is 100 + its index. */
int kent_build_pipe(kent_build *b, const char *id, const char *route, double bore,
                    double wave_speed);

int kent_build_fixed_level(kent_build *b, const char *at, double level); /* m */
int kent_build_outflow(kent_build *b, const char *at, double flow);      /* m3/s */

/* Linear characteristic, fully open; capacity m^2.5/s (NAN: set .flow afterwards);
 * discharge_level m, NAN: in line. Size: 1 m until changed. */
int kent_build_valve(kent_build *b, const char *id, const char *at, double capacity,
                     double discharge_level);

/* Devices, with what is common (in brackets) until changed in b->model; flow_to and
 * next_to: the next point, or NULL. Their lines are 700 + their index.
 *
 * A pump by three points of a parabola: head at no flow, rated flow and head, and as
 * much beyond (efficiency 0.8, 1480 rpm, one unit, it runs, inertia 5 kg m2, no check
 * valve; in line: set suction_level otherwise). */
int kent_build_pump(kent_build *b, const char *id, const char *at, const char *flow_to,
                    double head_at_no_flow, double rated_flow, double rated_head);
int kent_build_check_valve(kent_build *b, const char *id, const char *at,
                           const char *flow_to); /* 300 mm, K 1, ideal */
/* Pa (300 mm, full opening 0.1 m^2.5/s, 10 s for the stroke). */
int kent_build_control_valve(kent_build *b, const char *id, const char *at,
                             const char *flow_to, kent_holds holds,
                             double set_pressure);
int kent_build_surge_tank(kent_build *b, const char *id, const char *at,
                          double area); /* bottom 0, no overflow, 1 m, no losses */
int kent_build_one_way_tank(kent_build *b, const char *id, const char *at, double area,
                            double level); /* never empty, 0.3 m, K 4 */
/* Exponent 1.2, 300 mm, K in 12, out 5, level fixed at the point's. */
int kent_build_air_vessel(kent_build *b, const char *id, const char *at,
                          double total_volume, double gas_volume);
/* Opens fully 10 % above set_pressure, Pa; 200 mm, discharges at the point's level,
 * opens at once, closes in 20 s, does not anticipate. */
int kent_build_relief_valve(kent_build *b, const char *id, const char *at,
                            double set_pressure, double capacity);
/* One, coefficients 0.6, no slam. */
int kent_build_air_valve(kent_build *b, const char *id, const char *at,
                         double admission_orifice, double release_orifice);

/* For an event to break; events[].coefficient is 0 until set. */
int kent_build_burst(kent_build *b, const char *at);

int kent_build_scenario(kent_build *b, const char *id, double duration); /* s */

/* A state with both factors 1 until changed; the first one added takes the place of
 * "normal". */
int kent_build_state(kent_build *b, const char *id);

/* In the state added last the fixed level of that index stands at level, m. */
void kent_build_state_level(kent_build *b, int state, int fixed_level, double level);

/* The scenario added last starts from that state: without any, from all. */
void kent_build_starts_from(kent_build *b, int scenario, int state);

/* An event of the scenario added last: `scenario` must be its index. s, s, and opening
 * or m3/s. */
int kent_build_ramp(kent_build *b, int scenario, kent_event_kind kind, int target,
                    double start_time, double ramp_time, double to);

/* The same by a law of count points after start_time. */
int kent_build_law(kent_build *b, int scenario, kent_event_kind kind, int target,
                   double start_time, const kent_law_point *law, size_t count);

/* Horizontal allowable bearing Pa, unit weight N/m3; the rest not stated. Becomes the
 * ground's with cover m. */
int kent_build_soil(kent_build *b, const char *id, double allowable_bearing,
                    double unit_weight, double cover);

/* An empty note on the point's fitting (everything from geometry), to be filled in. */
int kent_build_note(kent_build *b, const char *at);

/* A ports-only fitting of `type` (-1: from the ports); the ports are copied. */
int kent_build_ports(kent_build *b, const char *id, int type, const kent_port *ports,
                     size_t count);

/* A port for kent_build_ports: direction (any length), Pa gauge, m3/s out of the
 * fitting, inside diameter m; seal diameter the same; momentum factor 1. */
kent_port kent_build_port(kent_vec3 direction, double pressure, double flow,
                          double inside_diameter);

/* Derives, and fails the test with the complaints if there are any. */
void kent_build_derive(kent_build *b);

/* Derives and expects complaints: returns the first one's text (b's). */
const char *kent_build_complaint(kent_build *b);

/* Derives and expects one complaint, holding this text, at this line of "built.cfg";
 * clears b. */
void kent_build_refused(kent_build *b, const char *text, int line);

/* Derived things by id, failing the test where there is none. */
int kent_build_span_of(const kent_build *b, const char *id);
int kent_build_fitting_of(const kent_build *b, const char *id);
int kent_build_node_of(const kent_build *b,
                       const char *point); /* the first one there */

#endif
