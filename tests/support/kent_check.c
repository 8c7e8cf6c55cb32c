#include "kent_check.h"

#include <math.h>

void kent_check_close(double got, double want, double rel, double gap, const char *file,
                      int line)
{
    if (fabs(got - want) <= fmax(gap, rel * fabs(want))) return; /* NaN falls through */
    print_error("got %.17g, want %.17g (relative %g, absolute %g)\n", got, want, rel,
                gap);
    _fail(file, line);
}
