#include "kent_flap_internal.h"

#include <math.h>

/* Share of the delay that rounding of a counted time may leave undone. */
static const double DELAY_END = 1.0 - 1e-12;

kent_flap kent_flap_new(kent_check_kind kind, double delay, double flow)
{
    const bool at_once = kind == KENT_CHECK_DELAYED && !(delay > 0.0);
    return (kent_flap){.kind = at_once ? KENT_CHECK_IDEAL : kind,
                       .shut = !(flow > 0.0),
                       .delay = delay,
                       .since = NAN,
                       .opened = -INFINITY};
}

bool kent_flap_move(kent_flap *f, double time, double flow)
{
    if (f->kind != KENT_CHECK_DELAYED || f->shut) return false;
    f->near = !(time - f->opened >= f->delay * DELAY_END);
    if (!(time - f->since >= f->delay * DELAY_END)) return false;
    f->shut = true;
    f->since = NAN;
    f->stopped = fmax(f->stopped, -flow);
    return true;
}

bool kent_flap_is_one_way(const kent_flap *f)
{
    switch (f->kind) {
    case KENT_CHECK_NONE:
        return false;
    case KENT_CHECK_IDEAL:
        return true;
    case KENT_CHECK_DELAYED:
        break;
    }
    return f->shut || f->near;
}

/* 13.13 */
kent_flap_gap kent_flap_law(double q, double gap, double slope, double z)
{
    const double at = q < 0.0 ? gap + slope * q : gap;
    if (z * q < at) return (kent_flap_gap){z * q, z, true};
    return (kent_flap_gap){at, slope, false};
}

/* 13.14 */
void kent_flap_settle(kent_flap *f, double before, double flow, double time,
                      double step)
{
    if (flow > 0.0) {
        if (f->shut) f->opened = time - step;
        f->shut = false;
        f->since = NAN;
    } else if (f->kind == KENT_CHECK_IDEAL || f->near) {
        f->shut = true;
    } else if (flow < 0.0 && !f->shut && isnan(f->since)) {
        f->since = time - step * (flow / (flow - fmax(before, 0.0)));
    }
}
