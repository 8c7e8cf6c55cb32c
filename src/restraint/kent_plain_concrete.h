/* Plain concrete of a block, by one of two codes: what a fitting may press on it, how
 * far it spreads a thrust beyond 45 degrees, and when it is strong enough for a test.
 *
 * Plain functions of numbers. Loads are design loads of the code, strengths those of a
 * cylinder: characteristic (EN 1992-1-1:2004) or specified (ACI 318-19). Lengths m,
 * forces N, stresses Pa, ages s from casting. */
#ifndef KENT_PLAIN_CONCRETE_H
#define KENT_PLAIN_CONCRETE_H

#include "kent_model.h"

/* A rectangle: the face of a block, its plan, or what a fitting presses on. Of a face
 * the width is level, of a plan it lies along the pipe. */
typedef struct kent_face {
    double width, height; /* m */
} kent_face;

/* The factor that a code puts on a variable load: concrete is designed for no less of
 * it. source docs/theory 19.2 */
double kent_concrete_least_factor(kent_concrete_code code);

/* ---- a fitting on its block ------------------------------------------------------ */

/* What a fitting on a pipe of that outside diameter surely presses on, body: m along it
 * that its shape surely has (0: nothing is known), source docs/theory 19.4; and a
 * stated area (m2) as a rectangle no wider across than the pipe is, source 19.5. */
kent_face kent_contact_usual(double diameter, double body);
kent_face kent_contact_of(double area, double diameter);

/* Pa that concrete may be pressed with all over; > 0. source 19.6, 19.7 */
double kent_concrete_pressed(kent_concrete_code code, double strength);

/* Factor on it, >= 1, where the contact stands in the middle of a larger side and the
 * block goes on for thickness behind it. source 19.8, 19.9 */
double kent_concrete_widening(kent_concrete_code code, kent_face contact,
                              kent_face side, double thickness);

/* ---- beyond 45 degrees ----------------------------------------------------------- */

/* Pa that concrete may be pulled with by bending, and sheared with; > 0. source 19.12,
 * 19.13 */
double kent_concrete_pulled(kent_concrete_code code, double strength);
double kent_concrete_sheared(kent_concrete_code code, double strength);

typedef struct kent_plain_use { /* load over resistance; INFINITY: no thickness left */
    double bending, shear;
    double punching; /* NAN: the code asks for no such check of plain footings */
} kent_plain_use;

/* A footing of plain concrete: its ground presses evenly on all of plan with load in
 * all, held in its middle on contact. source 19.14 .. 19.20 */
kent_plain_use kent_concrete_footing(kent_concrete_code code, double strength,
                                     kent_face contact, kent_face plan,
                                     double thickness, double load);

/* Whether every use is at most 1. */
bool kent_concrete_carries(const kent_plain_use *use);

/* ---- age ------------------------------------------------------------------------- */

/* Of the days t: t/(a + b t) of the strength where that is a hyperbola, else
 * exp(s (1 - sqrt(28/t))) of its mean. source 19.21, 19.22 */
typedef struct kent_pace {
    bool hyperbola;
    double s, a, b; /* -, days, - */
} kent_pace;
kent_pace kent_concrete_pace(kent_concrete_code code, kent_cement cement);

/* Pa at an age of more than 3 days; no more than strength. source 19.21, 19.22 */
double kent_concrete_strength_at(kent_concrete_code code, kent_cement cement,
                                 double strength, double age);

/* s: the least age at which it has wanted (Pa), in whole days and at least 3 of them;
 * NAN: never. source 19.23, 19.24 */
double kent_concrete_age(kent_concrete_code code, kent_cement cement, double strength,
                         double wanted);

#endif
