/* What the tests of the second method share: small mains, solved. */
#ifndef NETS_H
#define NETS_H

#include "kent_build.h"
#include "kent_check.h"
#include "kent_second.h"

/* Derives b and solves its steady state; fails the test where either fails. */
kent_steady *nets_steady(kent_build *b);

/* A loop of three pipes with friction, fed by two levels, with a valve in line, one
 * that discharges, and both kinds of outflow. Scenario 0: the discharging valve shuts
 * from 0.5 s on in 2 s, an outflow stops at once at 1 s; 4 s in all. */
kent_build nets_loop(void);

/* Runs scenario (-1: none, for duration s) on cells of at most `cell` m into peaks
 * [point_count]; fails the test where it fails. */
kent_second_report nets_run(const kent_build *b, const kent_steady *s, int scenario,
                            double duration, kent_mesh mesh, kent_second_peak *peaks);

#endif
