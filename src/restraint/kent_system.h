/* Restrained lengths that meet or overlap are one system: which fittings it holds, over
 * which stretches of which pipes, and how many joints that takes. A length that meets
 * no other is a system of its own, so that the list is the main's whole schedule of
 * restrained pipe, each joint counted once.
 *
 * source docs/theory/22-systems.md */
#ifndef KENT_SYSTEM_H
#define KENT_SYSTEM_H

#include "kent_model.h"

/* Pipe whose every joint is restrained, along one pipe. */
typedef struct kent_stretch {
    int pipe;
    double from, to;                 /* m from the pipe's start, from < to */
    double station_from, station_to; /* m */
    int joints;                      /* 0: the length of one pipe is not known */
} kent_stretch;

/* A leg that leads out of a system. */
typedef struct kent_outer {
    size_t fitting, port; /* whose leg it is */
    double length;        /* m; by the whole system's turn (22.2) or end (22.3) where
                             that asks for more than its own fitting */
    double needed, given; /* N, factored, that it must make up, and that the ground
                             gives along it */
    bool fits;
} kent_outer;

typedef struct kent_system_of {
    size_t fitting_first, fitting_count; /* into kent_systems.fittings */
    size_t stretch_first, stretch_count; /* into kent_systems.stretches */
    size_t outer_first, outer_count;     /* into kent_systems.outers */
    double length;                       /* m, of all stretches */
    int joints; /* of all stretches; 0: the length of one pipe is not known somewhere */
    double needed, given; /* N, factored, of all legs that lead out of it */
    bool fits;            /* every leg of it does */
    bool across;     /* a length runs on past a turn of nearly a right angle (22.4) */
    bool offset;     /* a crest and a sag next to each other */
    bool lengthened; /* a leg out of it runs further than its own fitting asks */
} kent_system_of;

typedef struct kent_systems {
    kent_system_of *at; /* [count] by their first fitting */
    size_t count;
    size_t *fittings; /* [fitting_count] of the model, rising within a system */
    size_t fitting_count;
    kent_stretch *stretches; /* [stretch_count] by pipe, then from */
    size_t stretch_count;
    kent_outer *outers; /* [outer_count] */
    size_t outer_count;
} kent_systems;

#endif
