#include "kent_device_internal.h"

#include <stdarg.h>
#include <stdio.h>

const kent_device_ops *const KENT_DEVICE_OPS[KENT_DEVICE_KINDS] = {
    [KENT_DEVICE_PUMP] = &KENT_AT_PUMP,
    [KENT_DEVICE_CHECK_VALVE] = &KENT_AT_CHECK_VALVE,
    [KENT_DEVICE_CONTROL_VALVE] = &KENT_AT_CONTROL_VALVE,
    [KENT_DEVICE_SURGE_TANK] = &KENT_AT_SURGE_TANK,
    [KENT_DEVICE_ONE_WAY_TANK] = &KENT_AT_ONE_WAY_TANK,
    [KENT_DEVICE_AIR_VESSEL] = &KENT_AT_AIR_VESSEL,
    [KENT_DEVICE_RELIEF_VALVE] = &KENT_AT_RELIEF_VALVE,
    [KENT_DEVICE_AIR_VALVE] = &KENT_AT_AIR_VALVE,
    [KENT_DEVICE_BURST] = &KENT_AT_BURST,
};

const kent_device_quantity *kent_device_quantities(kent_device_kind kind)
{
    return KENT_DEVICE_OPS[kind]->quantities;
}

kent_status kent_device_refuse(kent_error *err, const kent_model *m, kent_place place,
                               const char *id, const char *fmt, ...)
{
    char what[400], where[sizeof err->where];
    va_list args;

    va_start(args, fmt);
    (void)vsnprintf(what, sizeof what, fmt, args);
    va_end(args);
    kent_model_place_text(m, place, where, sizeof where);
    return kent_error_set(err, KENT_E_INPUT, where, "%s: %s", id, what);
}
