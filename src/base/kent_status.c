#include "kent_status.h"

const char *kent_status_text(kent_status status)
{
#define KENT_AS_CASE(name, text)                                                       \
    case name:                                                                         \
        return text;
    switch (status) {
        KENT_STATUS_LIST(KENT_AS_CASE)
    }
#undef KENT_AS_CASE
    return "unknown status";
}
