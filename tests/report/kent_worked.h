/* A printed hand calculation, worked out again from its digits. */
#ifndef KENT_WORKED_H
#define KENT_WORKED_H

#include <stddef.h>

/* Reads the lines of text that are in the regular form of a derivation (see
 * kent_steps.h), and fails the test unless
 * - the printed numbers of every computed line give its printed value, and
 * - those numbers are what its formula and the lines above say.
 * Returns how many computed lines there were. */
size_t kent_worked_check(const char *text);

#endif
