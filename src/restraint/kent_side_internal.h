/* Sides of concrete come in multiples of a step. A length within SLACK of a step above
 * a multiple is that multiple, so that 1.2 m in steps of 0.05 m stays 1.2 m although
 * 1.2/0.05 is 24.000000000000004 to a computer. */
#ifndef KENT_SIDE_INTERNAL_H
#define KENT_SIDE_INTERNAL_H

#include <math.h>

#define KENT_SIDE_SLACK      1e-6
#define KENT_SIDE_SLACK_TEXT "0.000001" /* the same, inside a printed formula */

/* m: so many steps, as the decimal a person would write where a metre is a whole number
 * of steps: 14 steps of 0.05 m are 0.7 m, not 0.7000000000000001 m. */
static inline double kent_side_of(double steps, double step)
{
    const double per_metre = round(1.0 / step);
    return per_metre * step == 1.0 ? steps / per_metre : steps * step;
}

/* m: the least multiple of step (m) that is at least x (m). */
static inline double kent_side_up(double x, double step)
{
    return kent_side_of(ceil(x / step - KENT_SIDE_SLACK), step);
}

/* m: the greatest multiple of step that is at most x. */
static inline double kent_side_down(double x, double step)
{
    return kent_side_of(floor(x / step + KENT_SIDE_SLACK), step);
}

#endif
