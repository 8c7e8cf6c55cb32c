/* Works out the arithmetic that the program prints, as a sceptic with a calculator
 * would: knowing only the printed digits.
 *
 * A number printed with six significant digits or more was rounded and stands for +-
 * half a unit of its last digit; a shorter one ("2", "0.5", "0") is exact. Everything
 * is carried as an interval, so an answer that cannot come from the digits shown is
 * caught however the rounding fell.
 *
 * Knows + - * / ^ ( ), pi, sin cos tan (of degrees; "22.5000deg" is a number), sqrt,
 * abs, ceil, min and max. */
#ifndef KENT_ARITH_H
#define KENT_ARITH_H

#include <stdbool.h>
#include <stddef.h>

typedef struct kent_interval {
    double lo, hi;
} kent_interval;

/* Returns false, and what is wrong in error (size bytes), where text is no arithmetic
 * or its value is not bounded (division by an interval that holds zero). */
bool kent_arith_evaluate(const char *text, kent_interval *out, char *error,
                         size_t size);

/* Whether the number at the start of printed ("316.692 kN", "(-3.50000)") can be the
 * value of arithmetic. Returns false and says why in error. */
bool kent_arith_agrees(const char *arithmetic, const char *printed, char *error,
                       size_t size);

#endif
