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

typedef struct kent_pump_curve {
    size_t count;                  /* of the own curve; at least 2 */
    double flow[KENT_PUMP_POINTS]; /* m3/s, rising from 0 */
    double head[KENT_PUMP_POINTS]; /* m, at rated speed */
    double
        efficiency[KENT_PUMP_POINTS]; /* -, at those flows; NAN: only the rated one */
    double rated_flow, rated_head;    /* m3/s, m */
    double rated_efficiency;
    double rated_speed;  /* rad/s */
    double rated_torque; /* N m: rho g Q H/(eta omega) */
    int stages;
    int suctions;          /* 2: double suction */
    double specific_speed; /* rpm, m3/s, m; per stage and per suction side */
    bool outside;          /* of the published range: the nearest curve is taken */
    double wh[KENT_SUTER_POINTS], wb[KENT_SUTER_POINTS]; /* Suter's, at that specific
                                                            speed: 13 */
} kent_pump_curve;

/* Works out torque, specific speed and the complete characteristics from the fields
 * above them. density kg/m3, gravity m/s2. Returns NULL, or what is wrong with the
 * curve in words ("its head rises with flow at pair 3"). source docs/theory/13-pumps.md
 */
const char *kent_pump_curve_complete(kent_pump_curve *c, double density,
                                     double gravity);

/* Head (m) and torque (N m) at a flow (m3/s) and speed (rad/s), with derivatives with
 * respect to flow (s/m2, N s/m2) and speed (m s, N m s). Finite and continuous for
 * every finite pair. */
typedef struct kent_pump_point {
    double head, head_by_flow, head_by_speed;
    double torque, torque_by_flow, torque_by_speed;
} kent_pump_point;
kent_pump_point kent_pump_at(const kent_pump_curve *c, double flow, double speed);

/* kg m2 of one unit, pump with water and motor, by published regression from rated
 * power (W) and speed (rad/s); +-50 %. source A. R. D. Thorley, Fluid Transients in
 * Pipeline Systems (pump term seen, motor term from memory). */
double kent_pump_inertia_estimate(double power, double speed);

#endif
