/* A quantity in words: "2.35 m", "11.2°", "150.0 kPa", in the units that are shown. */
#ifndef KENT_SAID_H
#define KENT_SAID_H

#include "kent_units.h"

typedef struct kent_said {
    char s[48];
} kent_said;

/* The unit as it is printed: "m²", "°C", "°". */
kent_said kent_said_unit(kent_kind kind, kent_system system);

/* An SI value with its unit, to the kind's usual decimals, or to whole units. */
kent_said kent_said_of(kent_kind kind, kent_system system, double si);
kent_said kent_said_whole(kent_kind kind, kent_system system, double si);

/* A station (m), "3+700" or "12+34.5" ft, to 0.01 where it is not whole. */
kent_said kent_said_station(kent_system system, double station);

#endif
