#include "kent_error.h"

#include <stdarg.h>
#include <stdio.h>

kent_status kent_error_set(kent_error *err, kent_status status, const char *where,
                           const char *fmt, ...)
{
    if (err->status != KENT_OK) return err->status; /* the first cause stays */

    va_list args;
    va_start(args, fmt);
    err->status = status;
    (void)snprintf(err->where, sizeof err->where, "%s", where ? where : "");
    (void)vsnprintf(err->what, sizeof err->what, fmt, args);
    va_end(args);
    return err->status;
}

kent_status kent_error_nomem(kent_error *err)
{
    return kent_error_set(err, KENT_E_NOMEM, "", "%s", kent_status_text(KENT_E_NOMEM));
}
