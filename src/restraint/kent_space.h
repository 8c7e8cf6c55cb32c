/* Which blocks collide, stand in ground that another leans on, or lean on the same; and
 * which mains run through it. All in plan: what stands in a wedge is taken to reach the
 * surface. */
#ifndef KENT_SPACE_H
#define KENT_SPACE_H

#include "kent_model.h"
#include "kent_wedge.h"

/* What a fitting's restraint takes up of the ground. */
typedef struct kent_footprint {
    bool placed; /* false: nothing leans or stands here, or no coordinates tell where */
    kent_vec3 along;                  /* level, unit: direction of the thrust */
    double behind, front, half_width; /* m of the concrete, from the fitting's centre;
                                         half_width 0: no concrete */
    bool leans, both_ways;            /* a face leans along it, or against it too */
    bool all_round;                   /* and square to it */
    kent_wedge wedge;                 /* of that face */
    bool pipe_leans;   /* a bend with restrained joints leans on its trench: */
    double side_from;  /* m from the axis: the side of the pipe */
    double side_reach; /* m from there to where the wedge ends */
} kent_footprint;

typedef enum kent_meeting {
    KENT_MEETS_BODY,   /* concrete in the place of concrete */
    KENT_MEETS_OPENED, /* the other's concrete stands in the ground that this leans on
                        */
    KENT_MEETS_SHARED, /* both lean on the same ground */
    KENT_MEETS_MAIN    /* another main runs through that ground */
} kent_meeting;

typedef struct kent_neighbour {
    size_t fitting; /* who is met */
    int other;      /* the other fitting; -1: a main */
    int pipe;       /* the main; -1 */
    kent_meeting how;
    double clear; /* m between the concrete of both, or from the fitting to the main */
    double share; /* of the ground that this leans on, at the surface, that the other
                     takes */
} kent_neighbour;

typedef struct kent_space {
    kent_neighbour *met; /* [count] by fitting, then what is listed first */
    size_t count;
} kent_space;

/* The first of a fitting's neighbours, and how many follow. */
const kent_neighbour *kent_space_of(const kent_space *space, size_t fitting,
                                    size_t *count);

void kent_space_clear(kent_space *space);

#endif
