/* A valve that moves by itself and lets nothing back: at the end of a step its capacity
 * is somewhere between two limits, where what it strives for is met, or else at the
 * limit that comes nearest. */
#ifndef KENT_STROKE_INTERNAL_H
#define KENT_STROKE_INTERNAL_H

#include "kent_device_internal.h"

/* How far it can travel in a step: openings, 0 .. 1. */
typedef struct kent_stroke {
    double least, most;
} kent_stroke;

/* opening: before the step; opening_time, closure_time: s for the whole way, 0: at
 * once. */
kent_stroke kent_stroke_from(double opening, double step, double opening_time,
                             double closure_time);

/* 14.9: f of a valve of capacity least .. most (m^2.5/s; 0: shut) between two heads
 * (m). wish: nil where it would stand still, positive where it passes too much; rising
 * with flow, falling with head[0], rising with head[1]. Not read where least is most.
 */
kent_device_law kent_stroke_law(double flow, const double head[2], double least,
                                double most, const kent_device_law *wish);

/* Its opening, from what it passed: within the stroke; that of `wish` (the value of
 * wish.f) where nothing flows. capacity: m^2.5/s when open. */
double kent_stroke_opening(const kent_stroke *stroke, double capacity, double flow,
                           const double head[2], double wish);

#endif
