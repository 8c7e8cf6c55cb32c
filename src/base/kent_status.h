/* One list of what can become of a call. */
#ifndef KENT_STATUS_H
#define KENT_STATUS_H

#define KENT_STATUS_LIST(X)                                                            \
    X(KENT_OK, "done")                                                                 \
    X(KENT_E_NOMEM, "out of memory")                                                   \
    X(KENT_E_INPUT, "the input cannot be accepted")                                    \
    X(KENT_E_SOLVE, "no solution was found")                                           \
    X(KENT_E_IO, "a file could not be read or written")

#define KENT_AS_ENUM(name, text) name,
typedef enum kent_status { KENT_STATUS_LIST(KENT_AS_ENUM) } kent_status;
#undef KENT_AS_ENUM

const char *kent_status_text(kent_status status);

#endif
