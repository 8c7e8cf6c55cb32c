/* The pressure of the site test: as given, or by a published rule from what the main
 * works under. */
#ifndef KENT_SITE_TEST_H
#define KENT_SITE_TEST_H

#include "kent_derivation.h"
#include "kent_steady.h"

/* ---- the rules, on numbers alone ------------------------------------------------- */

/* Pa gauge at the gauge: a factor (>= 1) on the working pressure there (docs/theory
 * 9.8). */
double kent_site_test_by_factor(double working, double factor);

/* Pa gauge at the gauge, by AWWA C600: 1.5 times the working pressure there and 1.25
 * times that of the main's highest point, brought to the gauge by the still water
 * between them, whichever is more (docs/theory 9.9). working, working_highest: Pa;
 * rise: m from the gauge up to the highest point (negative: it lies lower);
 * unit_weight: N/m3 of the water. */
double kent_site_test_c600(double working, double working_highest, double rise,
                           double unit_weight);

/* Pa gauge, by EN 805 where the surge is computed: the maximum design pressure with it
 * (Pa) and 100 kPa (docs/theory 9.10). */
double kent_site_test_en805_calculated(double design);

/* Pa gauge, by EN 805 where the surge is an assumed allowance: the lesser of 1.5 times
 * the maximum design pressure with it (Pa) and of it and 500 kPa (docs/theory 9.11). */
double kent_site_test_en805_assumed(double design);

/* m3/s that a new main of iron or PVC may take up while it is held under test, by AWWA
 * C600: length and nominal diameter m, pressure the mean of the test, Pa (docs/theory
 * 9.14). Editions up to 1999 allowed a ninth more. */
double kent_site_test_allowance(double length, double diameter, double pressure);

/* ---- of a main ------------------------------------------------------------------- */

/* The most that some cases bring, and which of them where. */
typedef struct kent_worst {
    double pressure;  /* Pa gauge; NAN: none */
    double level;     /* m, of that place */
    int point;        /* -1: none */
    const char *when; /* "static", "steady", "future" or a scenario's id: lives as long
                         as the model */
} kent_worst;

typedef struct kent_site_test {
    kent_test_rule rule;
    double pressure; /* Pa gauge, where the gauge is; NAN: no test, or not known yet */
    int gauge;       /* point; -1: at every fitting's own level */
    kent_worst at_gauge; /* working pressure there: of C600 and working-factor */
    kent_worst at_top;   /* and at the highest point of the main: of C600 */
    kent_worst design;   /* the highest anywhere: of EN 805, with the computed surge */
    bool partial;        /* some march that the rule asks for was not run */
} kent_site_test;

/* Working pressure is the higher of rest and of steady flow, in every state (steadies:
 * [state_count]). surge: the highest of all marches, where the rule computes it; NULL:
 * none was run yet, so that the pressure stays unknown. */
kent_site_test kent_site_test_find(const kent_model *m, kent_steady *const *steadies,
                                   const kent_worst *surge);

/* m3/s: the allowance over all pipes, on their bores, under this test's pressure at the
 * gauge; NAN: the pressure is not known, or no gauge is stated. */
double kent_site_test_main_allowance(const kent_model *m, const kent_site_test *t);

/* The rule as in the case file: "C600" ...; "given" of a pressure stated outright. */
const char *kent_site_test_rule_word(kent_test_rule rule);

/* Writes how the pressure was found, down to the lines p_test and z_gauge (own_level,
 * m, where there is no gauge). Lines rho and g stand above. */
void kent_site_test_derive(const kent_model *m, const kent_site_test *t,
                           double own_level, kent_derivation *d);

/* What of a test found by rule wants a second look: a gauge above the lowest point,
 * marches that were not run, a pressure that could not be found. */
void kent_site_test_caution(const kent_model *m, const kent_site_test *t,
                            kent_notes *cautions);

/* The lowest point of all pipes' routes; -1: no pipe. */
int kent_site_test_lowest_point(const kent_model *m);

#endif
