#include "ledger.h"

#include <math.h>

double ledger_held(size_t n, double b, double step, const double *head,
                   const double *flow)
{
    double sum = 0.0; /* m */
    for (size_t i = 0; i < n; i++) {
        sum += head[i] + b * flow[i] + head[i + 1] - b * flow[i + 1];
    }
    return 0.5 * sum * step / b;
}

double ledger_impedance(const kent_model *m, const kent_grid *grid, size_t span)
{
    return grid->wave_speed_used[span] / (m->gravity * m->spans[span].area);
}

double ledger_taken(const kent_model *m, const kent_device *d, const double *told)
{
    switch (d->kind) {
    case KENT_DEVICE_SURGE_TANK:
        return m->surge_tanks[d->index].area * told[0] + told[1];
    case KENT_DEVICE_ONE_WAY_TANK:
        return m->one_way_tanks[d->index].area * told[0];
    case KENT_DEVICE_AIR_VESSEL:
    case KENT_DEVICE_AIR_VALVE:
        return -told[0];
    case KENT_DEVICE_RELIEF_VALVE:
    case KENT_DEVICE_BURST:
        return told[1];
    case KENT_DEVICE_PUMP:
    case KENT_DEVICE_CHECK_VALVE:
    case KENT_DEVICE_CONTROL_VALVE:
    case KENT_DEVICE_KINDS:
        break;
    }
    return (double)NAN;
}

double ledger_flowed(const kent_device *d, double before, double after, double step)
{
    const bool at_the_end = d->kind == KENT_DEVICE_AIR_VALVE; /* 14.14 */
    return step * (at_the_end ? after : 0.5 * (before + after));
}

double ledger_left_over(const kent_model *m, int node, const double (*flow)[2],
                        const kent_device_row *devices)
{
    double sum = 0.0;
    const kent_node *at = &m->nodes[node];
    for (size_t i = 0; i < at->end_count; i++) {
        const kent_end *e = &m->ends[at->end_first + i];
        sum += e->side == 1 ? flow[e->span][1] : -flow[e->span][0];
    }
    for (size_t i = 0; i < m->device_count; i++) {
        if (m->devices[i].node[0] == node) sum -= devices[i].flow;
        if (m->devices[i].node[1] == node) sum += devices[i].flow;
    }
    return sum;
}
