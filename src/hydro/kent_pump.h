/* A pump in every quadrant: head and torque from flow and speed, for one unit.
 *
 * Its own curve (flow, head) rules where both flow and speed are those of normal
 * pumping; complete characteristics in Suter's form rule elsewhere, interpolated in
 * specific speed, and the two are blended without a jump. Flow positive from suction to
 * delivery, speed positive as it pumps, torque positive as the motor must give it. */
#ifndef KENT_PUMP_H
#define KENT_PUMP_H

#include <stdbool.h>
#include <stddef.h>

enum { KENT_PUMP_POINTS = 16, KENT_SUTER_POINTS = 89 };

/* Value and slope of what is added to Suter's curve beside the end of the own one: to
 * its head, and to the torque that its losses ask for. */
typedef struct kent_pump_join {
    double value, slope;
} kent_pump_join;

typedef struct kent_pump_curve {
    size_t count;                        /* of the own curve; at least 2 */
    double flow[KENT_PUMP_POINTS];       /* m3/s, rising from 0 */
    double head[KENT_PUMP_POINTS];       /* m, at rated speed; never rising */
    double efficiency[KENT_PUMP_POINTS]; /* -, at those flows but the first; all NAN:
                                            only the rated one is known */
    double rated_flow, rated_head;       /* m3/s, m: a point of the own curve */
    double rated_efficiency;
    double rated_speed; /* rad/s */
    int stages;
    int suctions; /* 2: double suction */
    /* worked out by kent_pump_curve_complete */
    double rated_torque;   /* N m: rho g Q H/(eta omega) */
    double specific_speed; /* rpm, m3/s, m; per stage and per suction side */
    bool outside;          /* of the published range: the nearest curve is taken */
    bool own_torque;       /* from efficiencies; else Suter's through rated torque */
    double torque[KENT_PUMP_POINTS]; /* N m, at rated speed */
    double head_slope[KENT_PUMP_POINTS], torque_slope[KENT_PUMP_POINTS]; /* by flow */
    double wh[KENT_SUTER_POINTS], wb[KENT_SUTER_POINTS]; /* Suter's, at that specific
                                                            speed: 13.3 */
    double wh_slope[KENT_SUTER_POINTS], wb_slope[KENT_SUTER_POINTS]; /* by angle */
    double last;       /* flow/speed, over its rated value, where the own one ends */
    double last_angle; /* rad: its angle there */
    kent_pump_join wh_join[2], wb_join[2]; /* at shut-off; at the own curve's end */
} kent_pump_curve;

/* Works out the second part of the fields from the first. density kg/m3, gravity m/s2.
 * Returns NULL, or what is wrong with the curve in words ("its head rises with flow").
 * source 13.1 to 13.8 */
const char *kent_pump_curve_complete(kent_pump_curve *c, double density,
                                     double gravity);

/* Where c->outside: why that asks for caution, as a sentence. */
void kent_pump_caution(const kent_pump_curve *c, char *out, size_t size);

/* Head (m) and torque (N m) at a flow (m3/s) and speed (rad/s), with derivatives with
 * respect to flow (s/m2, N s/m2) and speed (m s, N m s). Finite and continuous, with
 * continuous derivatives, for every pair within 1e100 times the rated one but where
 * flow and speed are both nil: there the derivatives are nil. source 13.2 to 13.8 */
typedef struct kent_pump_point {
    double head, head_by_flow, head_by_speed;
    double torque, torque_by_flow, torque_by_speed;
} kent_pump_point;
kent_pump_point kent_pump_at(const kent_pump_curve *c, double flow, double speed);

/* kg m2 of one unit, pump with water and motor, by published regression from rated
 * power (W) and speed (rad/s); +-50 %. source 13.9 (pump term seen, motor term from
 * memory). */
double kent_pump_inertia_estimate(double power, double speed);

#endif
