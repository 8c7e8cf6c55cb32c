/* Inside report/ only: what a fitting's pressure was in every load case and scenario,
 * side by side, and the extremes of the whole main. All Pa gauge, at the fitting's
 * centre. */
#ifndef KENT_PRESSURES_H
#define KENT_PRESSURES_H

#include "kent_job.h"

/* Columns of the pressure table; GIVEN: the one case of a fitting without a network. */
typedef enum kent_pressure {
    KENT_PRESSURE_STEADY,
    KENT_PRESSURE_STATIC,
    KENT_PRESSURE_SHUT_OFF, /* where there are pumps */
    KENT_PRESSURE_TEST,
    KENT_PRESSURE_FUTURE, /* where the case expects one */
    KENT_PRESSURE_HIGHEST,
    KENT_PRESSURE_LOWEST,
    KENT_PRESSURE_GIVEN,
    KENT_PRESSURES
} kent_pressure;

typedef struct kent_pressures {
    double at[KENT_PRESSURES];   /* Pa; NAN: not there */
    double rating[KENT_RATINGS]; /* Pa, the least of the pipes that meet; with surge,
                                    recurring or not, and under test only where one
                                    has such a rating of its own; NAN: not known */
    int governs;                 /* kent_pressure; -1: nothing governs */
    int highest_in, lowest_in;   /* index into results' scenarios; -1 */
} kent_pressures;

kent_pressures kent_pressures_of(const kent_results *r, size_t fitting);

/* One extreme of the main: a pressure, its place and its instant. */
typedef struct kent_extreme {
    double pressure; /* Pa gauge; NAN: nothing was found */
    double time;     /* s; NAN where the place lies between points */
    int point;       /* -1: between points */
    int span;        /* -1: at a point */
    double chainage; /* m from the pipe's start */
    int scenario;    /* index into results' scenarios; -1 */
} kent_extreme;

/* Highest and lowest of one scenario, by index into results' scenarios. A place between
 * points is named only where it beats every point by more than 1 kPa. */
kent_extreme kent_extreme_highest(const kent_results *r, size_t scenario);
kent_extreme kent_extreme_lowest(const kent_results *r, size_t scenario);

/* Heads in the steady state, m, into head [point_count]; NAN for a point on no span. */
void kent_point_steady_heads(const kent_model *m, const kent_steady *s, double *head);

#endif
