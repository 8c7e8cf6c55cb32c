/* One pumping station or check valve alone, between a level and a frictionless main of
 * one pipe that ends at another level, or never. */
#ifndef PUMP_RIG_H
#define PUMP_RIG_H

#include "kent_device_internal.h"

enum { RIG_EVENTS = 32, RIG_STEPS = 40000 };

typedef struct rig {
    kent_model model;
    kent_pump pump;
    kent_check_valve valve;
    kent_scenario scenario;
    kent_event events[RIG_EVENTS];
    kent_node nodes[2];
    kent_end ends[1];
    kent_span spans[1];
    const kent_device_ops *ops;
    kent_device_state state;
    kent_schedule *schedule;
    double y;         /* m2/s, of the main: g A/a */
    double far_level; /* m, at its end */
    size_t delay;     /* steps that a wave takes there and back; 0: it never ends */
    double step, time;
    size_t steps;
    double flow, head[2];       /* now, of the whole station */
    double sent[RIG_STEPS + 1]; /* m: the wave sent at each instant */
} rig;

/* Units of 200 L/s at 50 m each, 84 %, of that specific speed, with 12 kg m2, that draw
 * from 0 m. Fields may be changed before rig_start. */
void rig_pump(rig *r, double specific_speed, int in_parallel, int running);

void rig_event(rig *r, kent_action action, double start_time, double ramp_time,
               int how_many, double to);

/* The main: bore area m2 and a m/s; what flows in the steady state is that of all
 * running units at their rated point, or at flow m3/s each. */
void rig_start(rig *r, double area, double wave_speed, double unit_flow, double step,
               size_t delay);
void rig_advance(rig *r);
void rig_clear(rig *r);

/* At a flow (m3/s) the device's law with the heads that the main then has. */
kent_device_law rig_law(const rig *r, double flow);

double rig_told(const rig *r, int which);

#endif
