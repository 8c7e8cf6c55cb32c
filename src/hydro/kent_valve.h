/* What a valve passes: capacity against opening.
 *
 * capacity E, m^2.5/s: flow = E sqrt(head loss). From a loss coefficient K on the
 * valve's own size, E = A sqrt(2 g / K). */
#ifndef KENT_VALVE_H
#define KENT_VALVE_H

#include <stdbool.h>
#include <stddef.h>

enum { KENT_VALVE_POINTS = 32 };

/* Relative capacity against opening: E/E_open = sqrt(K_open/K). Straight lines between
 * points, down to zero at closed. */
typedef struct kent_valve_curve {
    size_t count;
    double opening[KENT_VALVE_POINTS];  /* 0 closed .. 1 open, rising */
    double capacity[KENT_VALVE_POINTS]; /* relative, 1 at full opening */
    double lowest_given; /* opening below which the curve is assumed, not tabulated */
} kent_valve_curve;

/* From (opening, K) pairs in any order; needs at least two, openings within 0 .. 1, K >
 * 0. K at full opening is the table's at 1, or its last point's, which then counts
 * as 1. Returns false where the pairs cannot make a curve. */
bool kent_valve_curve_from_loss(const double *opening, const double *loss, size_t count,
                                kent_valve_curve *out);

/* Capacity in proportion to opening. */
kent_valve_curve kent_valve_curve_linear(void);

/* Relative capacity, 0 .. 1; opening is held within 0 .. 1. */
double kent_valve_relative_capacity(const kent_valve_curve *curve, double opening);

/* m^2.5/s at full opening, from K on bore size (m), from Kv (m3/h at 1 bar, water of
 * 1000 kg/m3) and from Cv (US gallon/min at 1 psi). gravity m/s2. source IEC 60534-1
 * for Kv, Cv. */
double kent_valve_capacity_from_loss(double loss, double size, double gravity);
double kent_valve_capacity_from_kv(double kv, double gravity);
double kent_valve_capacity_from_cv(double cv, double gravity);

#endif
