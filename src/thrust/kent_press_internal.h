/* What presses on a closed end: the load case that asks for the most there. Only
 * thrust/ looks inside. */
#ifndef KENT_PRESS_INTERNAL_H
#define KENT_PRESS_INTERNAL_H

#include "kent_recorder_internal.h"

typedef struct kent_press {
    kent_case_kind kind;
    bool later;            /* the pressure expected later */
    double pressure, time; /* Pa, at the fitting's centre; s, NAN outside marches */
    kent_march march;      /* the state of a steady flow; -1, -1: none */
    bool in_full;          /* picked by SF p alone; else over what soil may bear more */
} kent_press;

/* Of all cases, the one with the greatest SF p at one port, in full or over what soil
 * may bear more in it (9.4); whole: at the port with the widest pipe, by the highest
 * heads of the fitting. */
kent_press kent_press_most(const kent_recorder *r, const kent_site_test *test,
                           size_t fitting, size_t port, bool whole, bool in_full);

/* Makes p the most if it asks for more, as most is picked, or if nothing did (pressure
 * NAN). */
void kent_press_take(const kent_model *m, kent_press *most, kent_press p);

/* Pa, at the fitting's centre: under the site test (9.1), under the highest level
 * connected (9.2), of pumps at no flow (9.15) and as expected later (9.12); NAN where
 * there is none. */
double kent_press_of_test(const kent_model *m, const kent_site_test *test,
                          const kent_fitting *f);
double kent_press_static(const kent_model *m, const kent_fitting *f);
double kent_press_shut_off(const kent_model *m, const kent_fitting *f);
double kent_press_later(const kent_model *m, const kent_fitting *f);

/* The factor of a kind of case: as the case gives it, else as the design rules do. */
double kent_press_factor(const kent_model *m, kent_case_kind kind);

kent_case_kind kent_press_kind_of(const kent_scenario *s);

#endif
