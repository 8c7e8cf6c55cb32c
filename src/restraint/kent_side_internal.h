/* Sides of concrete come in multiples of a step. A length within SLACK of a step above
 * a multiple is that multiple, so that 1.2 m in steps of 0.05 m stays 1.2 m although
 * 1.2/0.05 is 24.000000000000004 to a computer. */
#ifndef KENT_SIDE_INTERNAL_H
#define KENT_SIDE_INTERNAL_H

#include <math.h>

#define KENT_SIDE_SLACK      1e-6
#define KENT_SIDE_SLACK_TEXT "0.000001" /* the same, inside a printed formula */

/* m: the least multiple of step (m) that is at least x (m). */
static inline double kent_side_up(double x, double step)
{
    return ceil(x / step - KENT_SIDE_SLACK) * step;
}

/* m: the greatest multiple of step that is at most x. */
static inline double kent_side_down(double x, double step)
{
    return floor(x / step + KENT_SIDE_SLACK) * step;
}

#endif
