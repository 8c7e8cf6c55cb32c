#include "kent_device_internal.h"

const kent_device_ops *const KENT_DEVICE_OPS[KENT_DEVICE_KINDS] = {
    [KENT_DEVICE_PUMP] = &KENT_AT_PUMP,
    [KENT_DEVICE_CHECK_VALVE] = &KENT_AT_CHECK_VALVE,
};

const kent_device_quantity *kent_device_quantities(kent_device_kind kind)
{
    static const kent_device_quantity none[KENT_TOLD];
    return KENT_DEVICE_OPS[kind] ? KENT_DEVICE_OPS[kind]->quantities : none;
}

kent_status kent_device_check(const kent_model *m, kent_error *err)
{
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        if (KENT_DEVICE_OPS[d->kind]) continue;
        return kent_error_set(err, KENT_E_INPUT, "",
                              "point %s: what \"%s\" does in a surge is not in this "
                              "version",
                              m->points[d->point].id, d->id);
    }
    return KENT_OK;
}
