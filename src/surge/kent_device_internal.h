/* What stands at nodes besides levels, outflows and valves: pumps, vessels, tanks ...
 *
 * A device passes one flow q (m3/s; as kent_device says, positive from head[0] to
 * head[1], or out of the main) and has one equation f(q, head[0], head[1]) = 0 that
 * holds at the end of a step. It never falls as q rises, nor rises with head[0], nor
 * falls with head[1]: then the nodes and devices of one place have one answer, found
 * together by kent_cluster. A pump is the exception where its curve rises.
 *
 * One step: kent_device_ops.move sets what the schedule says and whatever the law needs
 * of the step before; law is asked as often as the search likes and changes nothing;
 * settle takes the accepted flow and heads and moves the state on to the new instant.
 * t = 0: start, from the steady state. A device left out is never asked: q = 0.
 *
 * A new device is a file kent_at_NAME.c, whose one public name is its kent_device_ops,
 * declared below, and one row of KENT_DEVICE_OPS in kent_device.c. None allocates. None
 * calls libm but sqrt (kent_log, kent_pow of base/ instead), so that bits are the same
 * everywhere. */
#ifndef KENT_DEVICE_INTERNAL_H
#define KENT_DEVICE_INTERNAL_H

#include "kent_marcher.h"
#include "kent_schedule_internal.h"

/* Bytes of a device's state between instants; its file asserts that its own fits. */
enum { KENT_DEVICE_STATE = 1280 };

typedef struct kent_device_state {
    _Alignas(16) unsigned char bytes[KENT_DEVICE_STATE];
} kent_device_state;

/* f in metres of head, with its derivatives with respect to flow (s/m2) and heads (-).
 * A flow that is nil by its law (a shut valve) is f = q x 1 s/m2. */
typedef struct kent_device_law {
    double f, by_flow, by_head[2];
} kent_device_law;

typedef struct kent_device_ops {
    kent_device_quantity quantities[KENT_TOLD]; /* what `tell` tells, in this order */
    /* flow: m3/s in the steady state; head: m at its nodes then (that of the suction
     * level, or of the point's level in free air, where there is no node). Fails with
     * KENT_E_INPUT where the steady state does not suit it (a tank overflows). */
    kent_status (*start)(kent_device_state *state, const kent_model *m, int index,
                         double flow, const double head[2], kent_error *err);
    /* To the step that ends at time (s) and lasts step (s). */
    void (*move)(kent_device_state *state, const kent_schedule *schedule, double time,
                 double step);
    kent_device_law (*law)(const kent_device_state *state, double flow,
                           const double head[2]);
    void (*settle)(kent_device_state *state, double flow, const double head[2]);
    /* What histories and extremes show besides the flow; the rest is left alone. NULL
     * where there is nothing. */
    void (*tell)(const kent_device_state *state, double told[KENT_TOLD]);
    /* NULL, or where the state is beyond what it can be, as a sentence goes on after
     * what it is and its id: "is empty: ..."; the march stops with it. NULL where it
     * never is. */
    const char *(*beyond)(const kent_device_state *state);
    /* The same of what does not stop the march but must be told with the results:
     * "overflowed"; at any instant, of all that happened since t = 0. NULL where there
     * is never anything. */
    const char *(*caution)(const kent_device_state *state);
} kent_device_ops;

extern const kent_device_ops KENT_AT_SURGE_TANK, KENT_AT_ONE_WAY_TANK,
    KENT_AT_AIR_VESSEL, KENT_AT_RELIEF_VALVE, KENT_AT_AIR_VALVE, KENT_AT_CONTROL_VALVE,
    KENT_AT_BURST, KENT_AT_PUMP, KENT_AT_CHECK_VALVE;

/* By kind. */
extern const kent_device_ops *const KENT_DEVICE_OPS[KENT_DEVICE_KINDS];

/* For start: KENT_E_INPUT at a place, "ST: what is wrong". */
__attribute__((format(printf, 5, 6))) kent_status
kent_device_refuse(kent_error *err, const kent_model *m, kent_place place,
                   const char *id, const char *fmt, ...);

#endif
