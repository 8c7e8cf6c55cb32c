/* What cmocka lacks for a numerical program: its own float assertion is single
 * precision in the packaged release. */
#ifndef KENT_CHECK_H
#define KENT_CHECK_H

#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

/* Fails, printing both sides, unless |got - want| <= rel |want|. NaN fails. */
#define assert_close(got, want, rel)                                                   \
    kent_check_close(got, want, rel, 0.0, __FILE__, __LINE__)

/* The same with an absolute tolerance, in the unit of the quantity itself. */
#define assert_within(got, want, gap)                                                  \
    kent_check_close(got, want, 0.0, gap, __FILE__, __LINE__)

void kent_check_close(double got, double want, double rel, double gap, const char *file,
                      int line);

#endif
