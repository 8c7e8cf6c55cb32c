/* A pipe wall as a ring pressed from outside. */
#ifndef KENT_RING_H
#define KENT_RING_H

/**
 * Pressure, outer less inner, at which a long round unsupported pipe buckles.
 *
 * units    modulus Pa, wall m, diameter m (of the middle of the wall) -> Pa
 * sign     positive: pressed from outside
 * range    thin walls; poisson 0 .. 0.5
 * assumes  round, elastic, nothing beside it, no factor; a plastic under lasting
 *          pressure has a lower modulus than that of the surge
 * fails    never; NaN in gives NaN out
 * source   docs/theory/18-limits.md, 18.1
 */
double kent_ring_collapse(double modulus, double poisson, double wall, double diameter);

#endif
