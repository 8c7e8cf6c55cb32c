/* Text with a unit to SI, and SI to what is displayed. Past this header a double is SI.
 *
 * Every kind of quantity the program knows is one row of KENT_KIND_LIST; a unit that
 * measures another kind is refused, by dividing the units and looking whether anything
 * but a number is left (UDUNITS' own "convertible" accepts reciprocals). Angles and
 * rotation are kinds of their own here, although both are dimensionless in SI. */
#ifndef KENT_UNITS_H
#define KENT_UNITS_H

#include "kent_error.h"

/*  X(name, word with article, SI unit,
 *    shown in SI: unit, decimals; in US: unit, decimals; example in SI, in US)  */
#define KENT_KIND_LIST(X)                                                              \
    X(KENT_LENGTH, "a length", "m", "m", 2, "ft", 2, "1.4 m", "4.5 ft")                \
    X(KENT_DIAMETER, "a length", "m", "mm", 0, "in", 2, "600 mm", "24 in")             \
    X(KENT_AREA, "an area", "m2", "m2", 3, "ft2", 2, "1.2 m^2", "13 ft^2")             \
    X(KENT_VOLUME, "a volume", "m3", "m3", 2, "yd3", 2, "4.5 m^3", "6 yd^3")           \
    X(KENT_TIME, "a time", "s", "s", 2, "s", 2, "12 s", "12 s")                        \
    X(KENT_SPEED, "a speed", "m/s", "m/s", 2, "ft/s", 2, "1180 m/s", "3900 ft/s")      \
    X(KENT_FLOW, "a flow", "m3/s", "L/s", 1, "gpm", 0, "300 L/s", "4800 gpm")          \
    X(KENT_PRESSURE, "a pressure", "Pa", "bar", 2, "psi", 1, "15 bar", "220 psi")      \
    X(KENT_STRESS, "a stress", "Pa", "kPa", 1, "psf", 0, "150 kPa", "3000 psf")        \
    X(KENT_STRENGTH, "a strength", "Pa", "MPa", 1, "psi", 0, "25 MPa", "4000 psi")     \
    X(KENT_MODULUS, "a modulus", "Pa", "GPa", 1, "ksi", 0, "170 GPa", "24e6 psi")      \
    X(KENT_FORCE, "a force", "N", "kN", 1, "kip", 1, "25 kN", "5600 lbf")              \
    X(KENT_FORCE_PER_LENGTH, "a force per length", "N/m", "kN/m", 2, "lbf/ft", 0,      \
      "5.3 kN/m", "365 lbf/ft")                                                        \
    X(KENT_MOMENT, "a moment", "N m", "kN m", 1, "kip ft", 1, "25 kN m", "18 kip ft")  \
    X(KENT_UNIT_WEIGHT, "a unit weight", "N/m3", "kN/m3", 1, "pcf", 1, "19 kN/m^3",    \
      "120 pcf")                                                                       \
    X(KENT_DENSITY, "a density", "kg/m3", "kg/m3", 1, "lb/ft3", 2, "998 kg/m^3",       \
      "62.3 lb/ft^3")                                                                  \
    X(KENT_VISCOSITY, "a viscosity", "Pa s", "mPa s", 3, "cP", 3, "1.14 mPa s",        \
      "1.14 cP")                                                                       \
    X(KENT_TEMPERATURE, "a temperature", "K", "degC", 1, "degF", 0, "12 degC",         \
      "54 degF")                                                                       \
    X(KENT_WARMING, "a change of temperature", "K", "K", 1, "degR", 1, "12 K",         \
      "22 degR")                                                                       \
    X(KENT_EXPANSION, "a thermal expansion", "1/K", "1/MK", 1, "1/MK", 1, "12e-6 1/K", \
      "6.5e-6 1/degR")                                                                 \
    X(KENT_ANGLE, "an angle", "rad", "deg", 1, "deg", 1, "22.5 deg", "22.5 deg")       \
    X(KENT_ROTATION, "a rotation speed", "radian/s", "rpm", 0, "rpm", 0, "1480 rpm",   \
      "1770 rpm")                                                                      \
    X(KENT_INERTIA, "a moment of inertia", "kg m2", "kg m2", 2, "lb ft2", 1,           \
      "7.6 kg m^2", "180 lb ft^2")                                                     \
    X(KENT_POWER, "a power", "W", "kW", 1, "hp", 1, "150 kW", "200 hp")                \
    X(KENT_ACCELERATION, "an acceleration", "m/s2", "m/s2", 4, "ft/s2", 3,             \
      "9.81 m/s^2", "32.2 ft/s^2")                                                     \
    X(KENT_COMPLIANCE, "a compliance", "1/Pa", "1/GPa", 4, "1/ksi", 6,                 \
      "1.06e-10 1/Pa", "7.3e-7 1/psi")                                                 \
    X(KENT_RATIO, "a ratio", "1", "", 3, "", 3, "1.5", "1.5")

#define KENT_AS_ENUM(name, ...) name,
typedef enum kent_kind { KENT_KIND_LIST(KENT_AS_ENUM) KENT_KIND_COUNT } kent_kind;
#undef KENT_AS_ENUM

typedef enum kent_system { KENT_SI, KENT_US } kent_system;

typedef struct kent_units kent_units; /* the parsed unit database and a cache by text */

kent_status kent_units_new(kent_units **out, kent_error *err);
void kent_units_free(kent_units *u);

/* "600 mm" -> 0.6. Knows UDUNITS' names and the trade's short forms (gpm, igpm, mgd,
 * Ml/d, cfs, psig, psf, ksf, pcf, kip, deg, %, kgf/cm2, "m head", "ft head" for
 * pressures, at 1000 kg/m3 and 9.80665 m/s2). A temperature converts as a point on its
 * scale. Fails with KENT_E_INPUT and err->what as "'300 kPa' is a pressure where a flow
 * belongs; for instance "300 L/s" or "4800 gpm"", "... has no unit; write for instance
 * ...",
 * "... is not a unit ...", "'psia' ... pressures are gauge ..."; err->where stays
 * empty. */
kent_status kent_units_read(kent_units *u, const char *text, kent_kind kind, double *si,
                            kent_error *err);

/* The kind in words, "a flow"; its SI unit, "m3/s"; examples. */
const char *kent_kind_word(kent_kind kind);
const char *kent_kind_si(kent_kind kind);
const char *kent_kind_example(kent_kind kind, kent_system system);

/* Display: the unit's name, the usual number of decimals and SI value x factor +
 * offset. */
typedef struct kent_display {
    const char *unit;
    int decimals;
    double factor, offset;
} kent_display;

kent_display kent_units_display(kent_kind kind, kent_system system);
double kent_units_shown(kent_kind kind, kent_system system, double si);

#endif
