/* A block as a rigid body on the ground: its sides seen from the thrust, and what
 * stands against that. All forces N, unfactored. */
#ifndef KENT_STABILITY_INTERNAL_H
#define KENT_STABILITY_INTERNAL_H

#include "kent_holding_internal.h"

typedef struct kent_body {
    double length, breadth, height; /* m: along the level thrust, across it, high */
    double axis;                    /* m, of the pipe above the foot */
    double upright;               /* m from the toe, where what lifts or presses acts */
    double foot;                  /* m below ground; NAN: no cover is stated */
    double concrete, unit_weight; /* m3, N/m3, the latter less water's where wet */
    double prism;                 /* N of soil above that counts */
    double face;                  /* N that its face may bear; 0 without one */
} kent_body;

/* source docs/theory/20-stability.md, 20.7; axis_above as in kent_stability_find */
kent_body kent_body_of(const kent_holding_work *w, const kent_block *b,
                       double axis_above);

/* What one thrust asks of a body, and how its base presses. */
typedef struct kent_push {
    double sideways, up, down; /* N */
    double normal;             /* N on the base; <= 0: lifted */
    double friction, face;     /* N against sliding */
    double area;               /* m2 of the base that presses */
    double steadies, topples;  /* N m about the toe */
    double moment;             /* N m about the middle of the base, to the front */
    kent_base_pressure base;   /* nil where normal is not positive */
} kent_push;

/* increase: of the soil's bearing, >= 1. source 20.5 .. 20.10 */
kent_push kent_push_on(const kent_body *body, const kent_soil *soil, double sideways,
                       double up, double down, double increase);

/* The instant of a case whose factors stand in a kent_stand, as a push. */
kent_push kent_push_of(const kent_holding_work *w, const kent_holding *h,
                       const kent_body *body, const kent_load_case *c,
                       kent_sense sense);

/* Of any block of these dimensions at this fitting, whose demand, and by_sense of h,
 * must be known;
 * axis_above: m of pipe axis over the centre of the face, 0 as designed. */
void kent_stability_find(const kent_holding_work *w, const kent_holding *h,
                         const kent_block *b, double axis_above, kent_stability *out);

/* Enlarges h's block until it stands; a fault where none may be sized that does. */
kent_fault kent_stability_settle(const kent_holding_work *w, kent_holding *h);

/* What h's block reaches in the end, and its straps. */
void kent_stability_tell(const kent_holding_work *w, kent_holding *h);

/* "overturning 1.21 where 1.50 is asked": the first factor that is not reached, of a
 * block that does not stand. */
void kent_stability_says(const kent_stability *s, char *out, size_t size);

void kent_stability_caution(const kent_holding_work *w, kent_holding *h);
void kent_stability_derive(const kent_holding_work *w, kent_holding *h);

#endif
