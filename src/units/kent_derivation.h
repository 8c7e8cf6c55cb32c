/* A result that explains itself: the lines of a hand calculation, in order. Thrust and
 * restraint fill it; whoever prints it only walks it.
 *
 * A line is a quantity put in (formula NULL) or one computed from lines above it.
 * Values are SI here. They are printed in a coherent set, so that no formula needs a
 * conversion factor: m, s, t, kN, kPa, kN/m3, t/m3, m3/s in SI; ft, s, slug, lbf,
 * lbf/ft2, lbf/ft3, slug/ft3, ft3/s in US; angles in degrees.
 *
 * A formula is arithmetic on symbols of earlier lines: + - * / ^ ( ) numbers, pi, and
 * sin cos tan (of degrees), sqrt, abs, min, max, ceil. Symbols are
 * [A-Za-z][A-Za-z0-9_']*. Whatever prints a line replaces each symbol by that symbol's
 * printed digits; a test works out the printed arithmetic and must get the printed
 * result. */
#ifndef KENT_DERIVATION_H
#define KENT_DERIVATION_H

#include "kent_units.h"
#include <stdbool.h>
#include <stddef.h>

typedef enum kent_source {
    KENT_GIVEN,
    KENT_CATALOGUE,
    KENT_COMPUTED,
    KENT_ASSUMED
} kent_source;

typedef struct kent_line {
    char symbol[24]; /* empty: a heading or remark, only `says` is printed */
    double value;    /* SI */
    kent_kind kind;
    kent_source source;
    char formula[160]; /* empty: put in, not computed */
    char equation[16]; /* number in docs/theory, "5.3"; may be empty */
    char says[160];    /* what the symbol is; a heading's words */
} kent_line;

typedef struct kent_derivation {
    kent_line *lines; /* [count] */
    size_t count, capacity;
    bool failed; /* a line was lost for want of memory */
} kent_derivation;

void kent_derivation_heading(kent_derivation *d, const char *words);
void kent_derivation_put(kent_derivation *d, const char *symbol, double value,
                         kent_kind kind, kent_source source, const char *says);
void kent_derivation_work(kent_derivation *d, const char *symbol, double value,
                          kent_kind kind, const char *formula, const char *equation,
                          const char *says);
const kent_line *kent_derivation_find(const kent_derivation *d, const char *symbol);
void kent_derivation_clear(kent_derivation *d);

/* Printed form of the value alone ("316.692 kN"), six significant digits, coherent set.
 */
void kent_line_value(const kent_line *line, kent_system system, char *out, size_t size);

/* The formula with numbers put in for symbols; "" for a line without one. Angles appear
 * as "22.5deg". Later lines of the same symbol hide earlier ones. */
void kent_line_numbers(const kent_derivation *d, size_t index, kent_system system,
                       char *out, size_t size);

/* Unit of the coherent set for a kind: "kPa" or "lbf/ft2". */
const char *kent_coherent_unit(kent_kind kind, kent_system system);

#endif
