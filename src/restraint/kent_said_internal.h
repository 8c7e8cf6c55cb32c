/* A quantity in words, in the units that the case wants to see. */
#ifndef KENT_SAID_INTERNAL_H
#define KENT_SAID_INTERNAL_H

#include "kent_units.h"

#include <stdio.h>

typedef struct kent_said {
    char s[48];
} kent_said;

static inline kent_said kent_say(kent_system system, kent_kind kind, double value)
{
    const kent_display display = kent_units_display(kind, system);
    kent_said out;

    (void)snprintf(out.s, sizeof out.s, "%.*f %s", display.decimals,
                   kent_units_shown(kind, system, value), display.unit);
    return out;
}

#endif
