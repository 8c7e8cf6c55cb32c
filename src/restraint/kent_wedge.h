/* The wedge of ground in front of a face that must slide up before the face moves, and
 * what stands in its way. */
#ifndef KENT_WEDGE_H
#define KENT_WEDGE_H

/* rad: friction angle of soil where none is stated. */
#define KENT_WEDGE_ANGLE 0.52359877559829887 /* 30 degrees */

typedef struct kent_wedge {
    double front;          /* m, level, from the fitting's centre to the face */
    double half_width;     /* m, of the face */
    double base;           /* m, ground to the face's base */
    double friction_angle; /* rad */
    double wall_friction;  /* rad, of soil on the face, where its pressure is counted
                              on; 0 */
} kent_wedge;

/* m from the face to where the wedge meets the ground's surface. source 10.25; with
 * wall friction 21.13 */
double kent_wedge_reach(const kent_wedge *wedge);

/* m to either side of the thrust's line, at a level distance before the face (m, >= 0).
 * source 10.26 */
double kent_wedge_half_width(const kent_wedge *wedge, double before);

/* m by which a place is clear of the wedge, whatever its depth; 0: inside, or between
 * fitting and face. along: m, level, from the fitting's centre in the direction of the
 * thrust; across: m to either side of it. fails never. source docs/theory/10-blocks.md,
 * 10.25 .. 10.27 */
double kent_wedge_clearance(const kent_wedge *wedge, double along, double across);

/* m from the fitting's centre to the wedge's farthest part in a level direction, along
 * and across the thrust (unit vector): what runs on square to it is clear only beyond.
 * fails never. source 10.32 */
double kent_wedge_farthest(const kent_wedge *wedge, double along, double across);

#endif
