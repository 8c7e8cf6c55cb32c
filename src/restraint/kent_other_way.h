/* The other ways that a fitting is pushed. A face bears one way only: that of the case
 * that governs sideways. A main under suction pulls the other way, and a leg that is
 * shut turns the thrust of a cross. Cases within 45 degrees of each other push one way
 * (common practice, no source). */
#ifndef KENT_OTHER_WAY_H
#define KENT_OTHER_WAY_H

#include "kent_loads.h"

/* What takes such a push. */
typedef enum kent_taken {
    KENT_TAKEN_BY_NOTHING,  /* nothing that is known of */
    KENT_TAKEN_BY_FACE,     /* another side of the block, as large as its face */
    KENT_TAKEN_BY_FRICTION, /* the block's weight on its base, once tied to it */
    KENT_TAKEN_BY_JOINTS    /* the restrained legs, which hold both ways */
} kent_taken;

typedef struct kent_other_way {
    int load_case;    /* index into the fitting's: what pushes most that way */
    kent_vec3 thrust; /* N, of that instant, unfactored */
    double sideways;  /* N, its horizontal size, unfactored; at least 500 N */
    double load;      /* N, the same, factored */
    double time;      /* s; NAN outside marches */
    double turned;    /* rad from the way of what governs sideways, 0 .. pi */
    double friction;  /* N that the block's weight takes on its base; NAN: not known */
    bool slight;      /* suction, and less than a tenth of what governs, factored */
    kent_taken taken;
} kent_other_way;

enum { KENT_OTHER_WAYS = 8 };

/* Whether nothing takes it although something must: the fitting is not held then.
 * source docs/theory/09-load-cases.md, 9.21 */
bool kent_other_way_bars(const kent_other_way *way);

#endif
