/* What a fitting found from geometry and one stated by its ports have in common: known
 * to the files of fittings alone. */
#ifndef KENT_FITTING_INTERNAL_H
#define KENT_FITTING_INTERNAL_H

#include "kent_model_internal.h"

/* A branch at less than this makes a wye. rad: 75 degrees */
static const double KENT_WYE_BELOW = 75.0 * 3.14159265358979323846 / 180.0;

/* Whether a type may have so many legs, and branches without a pipe (0 or 1). */
bool kent_fitting_type_fits(kent_fitting_type type, size_t count, size_t branches);

/* rigid: no leg's joint slips. */
kent_restraint_choice kent_fitting_usual_restraint(const kent_fitting *f, bool rigid);

/* The first that is not NAN. */
double kent_first_given(double a, double b, double c);

/* What the legs themselves say: angle, way, sizes. */
void kent_fitting_describe_legs(kent_fitting *f, const kent_port *ports, size_t legs);

/* note, point, zone, ground: the first that says something. note may be NULL. */
void kent_fitting_describe_ground(const kent_model *m, const kent_fitting_note *note,
                                  kent_fitting *f);

/* kent_stated.c: what a note states for the restraint, run lengths by port. False with
 * a complaint where it names no leg of the fitting. note may be NULL. */
bool kent_stated_settle(const kent_model *m, const kent_fitting_note *note,
                        kent_fitting *f, const kent_port *ports,
                        kent_complaints *complaints);

#endif
