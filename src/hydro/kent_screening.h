/* Figures by hand beside those of the march: how far a surge is off what a reviewer
 * expects. They know one pipe, no friction and no reflection on the way. */
#ifndef KENT_SCREENING_H
#define KENT_SCREENING_H

#include <stddef.h>

/* Pa: a sudden change of velocity (m/s) in water of a density (kg/m3) and a wave speed
 * (m/s): rho a dV. fails: never, NaN in gives NaN out. source docs/theory 18.2 */
double kent_screening_sudden(double density, double wave_speed, double velocity);

/* Pa: a change of velocity spread evenly over a time (s, > 0) in a main of a length
 * (m), by Michaud: 2 rho L dV/T. It may come out too low where the velocity changes
 * unevenly. fails: never. source docs/theory 18.4 */
double kent_screening_slow(double density, double length, double velocity, double time);

/* Pa: the sudden one where the time (s) is shorter than the return time (s), beyond it
 * in proportion of the two: the linear rule. fails: never. source docs/theory 18.5 */
double kent_screening_linear(double sudden, double return_time, double time);

/* s: the time in which a flow would change whole if it went on changing as it does
 * between 10 and 90 % of the change. time [count] s, rising; flow [count] m3/s, each
 * read every so many elements. NAN: it does not change. source docs/theory 18.6 */
double kent_screening_effective_time(const double *time, size_t time_stride,
                                     const double *flow, size_t flow_stride,
                                     size_t count);

#endif
