/* Logarithm, power and angle for the marching loop: the same bits on every processor,
 * which the C library's do not promise (it picks other code where FMA is present). */
#ifndef KENT_MATH_H
#define KENT_MATH_H

/* Natural logarithm of a positive, finite, normal x; within 2 ulp. Others: libm's log.
 */
double kent_log(double x);

/* x to the power y for positive, normal x and |y ln x| < 700; relative error 1e-14. */
double kent_pow(double x, double y);

/* Angle of the direction (x, y) in radians, -pi .. pi, as libm's atan2 has it; within 2
 * ulp. 0 where both are nil, whatever their signs. Others above 1e300: libm's. */
double kent_atan2(double y, double x);

#endif
