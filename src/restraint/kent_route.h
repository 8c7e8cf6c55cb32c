/* What each way in which a soil's bearing can be told gives a face, side by side, and
 * which of them decides. */
#ifndef KENT_ROUTE_H
#define KENT_ROUTE_H

#include "kent_bearing.h"

typedef struct kent_bearing_way {
    bool stated; /* the soil states what this way wants to be told */
    bool decides;
    kent_bearing_gap gap;
    double bearing; /* Pa, allowable; NAN: not known */
    double area;    /* m2 that the factored sideways thrust asks for; NAN */
    double passive; /* -: coefficient that this bearing takes (10.24); NAN */
} kent_bearing_way;

typedef struct kent_bearing_view {
    bool seen;    /* false: no soil, or nothing leans on it */
    bool on_fill; /* of the fill between face and ground, which is weaker */
    kent_bearing_way ways[KENT_BEARING_WAYS];
    double depth;           /* m, of the face's centre; NAN */
    double water_table;     /* m below ground; INFINITY: none */
    double stress;          /* Pa, effective, at the centre; NAN: no unit weight */
    double cohesion;        /* Pa; NAN */
    double factor_inside;   /* 1: none */
    double falls;           /* rad, that the ground before the face falls by; 0 */
    double passive, active; /* N on the face, at failure by Rankine (21.4, 21.5), where
                               a face is sized on level ground; NAN */
} kent_bearing_view;

/* "presumptive", "by depth", "per depth", "passive (Rankine)", "passive (Coulomb)" */
const char *kent_way_word(kent_way way);

#endif
