/* Velocity profile: how much more momentum a stream carries than its mean speed tells.
 */
#ifndef KENT_PROFILE_H
#define KENT_PROFILE_H

/* Momentum factor beta: 4/3 laminar (Re <= 2000), 1 + 0.98 f turbulent (Re >= 4000), a
 * straight line in Re between. friction_factor is Darcy's. source docs/theory. */
double kent_momentum_factor(double reynolds, double friction_factor);

/* Kinetic energy factor alpha: 2 laminar, 1 + 2.7 f turbulent, a line between. */
double kent_energy_factor(double reynolds, double friction_factor);

/* Power-law profile u/umax = (y/R)^(1/n): V/umax, beta and alpha. */
void kent_power_profile(double n, double *mean, double *momentum, double *energy);

#endif
