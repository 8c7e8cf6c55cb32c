/* What a fitting's block and restrained legs reach by the dimensions that were built:
 * the factor in each load case and sense, from the same resistances that size them.
 *
 * source docs/theory/25-as-built.md */
#ifndef KENT_AS_BUILT_H
#define KENT_AS_BUILT_H

#include "kent_loads.h"

/* What one built part reaches in one load case. */
typedef struct kent_built_reach {
    int port;          /* the leg's; -1: of the block */
    int load_case;     /* index into the fitting's */
    kent_sense sense;  /* of a leg KENT_RESULTANT */
    double load;       /* N, unfactored, the part's share of it where two hold */
    double resistance; /* N; NAN: not known */
    double reached;    /* resistance over load; NAN: not known */
    double asked;
    double utilisation; /* asked over reached; INFINITY: nothing holds */
} kent_built_reach;

typedef struct kent_as_built {
    bool stated;               /* the case says how it was built */
    kent_built_reach *reaches; /* [count] the block's, then each leg's */
    size_t count, capacity;
    int worst;         /* the largest utilisation; -1: nothing could be told */
    bool falls_short;  /* some part reaches less than is asked, or cannot be told */
    double volume;     /* m3 of concrete as built; NAN: a dimension is not given */
    kent_notes broken; /* rules that the built dimensions break, and what is not told */
} kent_as_built;

/* -: what is left of a face's height (m) where the pipe's axis stands off its middle by
 * e (m, either way): it bears evenly on 1 - 2|e|/h of it; 0 where the axis leaves it.
 * source 25.2 */
double kent_built_share(double height, double e);

#endif
