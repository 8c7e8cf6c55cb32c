/* The same random looped network every time: 1000 spans of 19 reaches, 600 junctions
 * (a few more points carry devices), two fixed levels, outflows, and orifice valves
 * that close and open. Invented; no place. */
#ifndef NETWORK_H
#define NETWORK_H

#include "kent_build.h"

enum { NETWORK_SPANS = 1000, NETWORK_REACHES = 19 };

/* Derived, with one scenario; time_step set so that every span takes 19 reaches. */
kent_build network_build(void);

#endif
