/* The first cause of a failure, with its place. The caller owns it, starts it as {0}
 * and passes it last; it stays empty on success; whoever fails first fills it and
 * everybody above passes it on unchanged. */
#ifndef KENT_ERROR_H
#define KENT_ERROR_H

#include "kent_status.h"

typedef struct kent_error {
    kent_status status;
    char where[160]; /* "mains.cfg:42", or empty */
    char what[480];  /* "-300 mm is not a positive length; ..." */
} kent_error;

/* Keeps the first cause: a second call changes nothing. Returns err->status. */
__attribute__((format(printf, 4, 5))) kent_status kent_error_set(kent_error *err,
                                                                 kent_status status,
                                                                 const char *where,
                                                                 const char *fmt, ...);

/* KENT_E_NOMEM, without a place. */
kent_status kent_error_nomem(kent_error *err);

#endif
