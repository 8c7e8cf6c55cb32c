/* A device by itself, at the end of a pipe that never answers, or of a rigid one: no
 * marcher, no cluster, and a search that cannot miss, since a law rises with flow. */
#ifndef LONE_H
#define LONE_H

#include "kent_build.h"
#include "kent_check.h"
#include "kent_device_internal.h"

typedef struct lone {
    kent_build build;
    kent_model model; /* of build, with the test's own devices */
    const kent_device_ops *ops;
    kent_device_state state;
    kent_schedule *schedule;
    double time, step;    /* s */
    double flow, head[2]; /* now */
    double through;       /* m3 since t = 0, by the trapezoidal rule */
} lone;

/* What comes to a node: inflow = y (c - head); m, m2/s. y 0: the head is c. */
typedef struct lone_line {
    double c, y;
} lone_line;

/* Water of 1000 kg/m3, g = 9.81 m/s2, barometric 101 325 Pa, a point P at level z, in a
 * main of 100 m of 0.5 m, so that a scenario can be added to l->build before
 * lone_start. */
void lone_new(lone *l, const kent_device_ops *ops, double z);
/* From its steady state: head[1] only in line. Device 0 of its kind in l->model. */
void lone_start(lone *l, double flow, double head0, double head1, double step);
/* Expects that start refuses, with this text in what it says. */
void lone_refused(lone *l, double head0, const char *text);
void lone_clear(lone *l);

/* A step with these lines at head[0] and, in line, head[1] (y NAN: not in line). Fails
 * the test where the law has no answer or the device is beyond what it can be. */
void lone_step(lone *l, lone_line first, lone_line second);
/* The same of a device beside the main. */
void lone_beside(lone *l, double c, double y);

/* A rigid column of frictionless water, L/(g A) s2/m2, from a reservoir (m) to a
 * device, by the trapezoidal rule; it starts with the flow that lone_start was told. */
void lone_column(lone *l, double inertia, double reservoir);

/* m3/s of flow x m: law.f on the same heads; and that it never falls with flow or
 * head[1], nor rises with head[0], over a grid of spacing such that kinks are few;
 * derivatives against differences everywhere else. in_line: head[1] matters. */
void lone_check_law(const lone *l, double flow, double head, bool in_line);

double lone_told(const lone *l, int which);

#endif
