#include "kent_said.h"

#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <string.h>

kent_said kent_said_unit(kent_kind kind, kent_system system)
{
    static const struct {
        const char *plain, *printed;
    } SIGNS[] = {{"deg", "°"}, {"degC", "°C"}, {"degF", "°F"}};
    const char *unit = kent_units_display(kind, system).unit;
    kent_said out = {{0}};
    for (size_t i = 0; i < sizeof SIGNS / sizeof SIGNS[0]; i++) {
        if (strcmp(unit, SIGNS[i].plain) != 0) continue;
        (void)snprintf(out.s, sizeof out.s, "%s", SIGNS[i].printed);
        return out;
    }
    for (size_t i = 0, length = 0; unit[i] != '\0' && length + 3 < sizeof out.s; i++) {
        const char *raised = unit[i] == '2' ? "²" : unit[i] == '3' ? "³" : NULL;
        const char plain[2] = {unit[i], '\0'};
        const char *piece = raised ? raised : plain;
        memcpy(out.s + length, piece, strlen(piece) + 1);
        length += strlen(piece);
    }
    return out;
}

static kent_said with_decimals(kent_kind kind, kent_system system, double si,
                               int decimals)
{
    const kent_said unit = kent_said_unit(kind, system);
    const char *gap = unit.s[0] == '\0' || strcmp(unit.s, "°") == 0 ? "" : " ";
    const double shown = kent_units_shown(kind, system, si);
    const bool nothing = fabs(shown) < 0.5 * pow(10.0, -decimals); /* never "-0.0" */
    kent_said out;
    (void)snprintf(out.s, sizeof out.s, "%.*f%s%.16s", decimals, nothing ? 0.0 : shown,
                   gap, unit.s);
    return out;
}

kent_said kent_said_of(kent_kind kind, kent_system system, double si)
{
    return with_decimals(kind, system, si, kent_units_display(kind, system).decimals);
}

kent_said kent_said_whole(kent_kind kind, kent_system system, double si)
{
    return with_decimals(kind, system, si, 0);
}

kent_said kent_said_station(kent_system system, double station)
{
    const double shown = kent_units_shown(KENT_LENGTH, system, station);
    if (!(fabs(shown) < 1e12)) return kent_said_of(KENT_LENGTH, system, station);
    const long large = system == KENT_SI ? 1000 : 100; /* what stands before the + */
    const long cents = lround(fabs(shown) * 100.0), whole = cents / 100;
    const long share = cents % 100;
    kent_said out;
    int length = snprintf(out.s, sizeof out.s, "%s%ld+%0*ld",
                          shown < 0.0 && cents > 0 ? "-" : "", whole / large,
                          system == KENT_SI ? 3 : 2, whole % large);
    if (share == 0 || length < 0) return out;
    length += snprintf(out.s + length, sizeof out.s - (size_t)length, ".%02ld", share);
    if (share % 10 == 0) out.s[length - 1] = '\0';
    return out;
}
