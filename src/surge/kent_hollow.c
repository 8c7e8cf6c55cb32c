#include "kent_hollow_internal.h"

#include <stdbool.h>
#include <stddef.h>

enum { TRIES = 100 }; /* each at least halves what is left */
/* Of a flow: closer than this nothing changes. */
static const double NO_CHANGE = 1e-15;

double kent_hollow_head(const kent_hollow_side *side, double taken, double *by_taken)
{
    const kent_hollow *h = side->hollow;
    *by_taken = 0.0;
    if (!h) return side->c;
    const double rest = side->c - taken / side->y - h->limit;
    const kent_hollow_end end = kent_hollow_step(rest, h->volume, h->room, h->gas);
    *by_taken = -end.slope / side->y;
    return h->limit + end.rise;
}

/* A function that rises with the flow, and how fast. */
typedef struct law {
    double (*gap)(const struct law *law, double flow, double *slope);
    const kent_hollow_side *side;
    double capacity, sign;  /* of a valve */
    double flow, z, per_z2; /* of an outflow */
} law;

/* Where it is nil between nil and `most`: Newton's method between brackets, halving
 * them where it leaves them. It is below nil at nil, and above at most. */
static double find_flow(const law *l, double most)
{
    double low = 0.0, high = most, flow = 0.5 * most;
    for (int i = 0; i < TRIES && high - low > NO_CHANGE * most; i++) {
        double slope = 0.0;
        const double gap = l->gap(l, flow, &slope);
        if (gap == 0.0) return flow;
        if (gap > 0.0) high = flow;
        if (gap < 0.0) low = flow;
        const double newton = flow - gap / slope;
        const double next =
            i % 3 < 2 && newton > low && newton < high ? newton : 0.5 * (low + high);
        if (fabs(next - flow) <= NO_CHANGE * most) return next;
        flow = next;
    }
    return flow;
}

static double gate_gap(const law *l, double size, double *slope)
{
    double by[2];
    const double flow = l->sign * size, per = 1.0 / (l->capacity * l->capacity);
    const double from = kent_hollow_head(&l->side[0], flow, &by[0]);
    const double to = kent_hollow_head(&l->side[1], -flow, &by[1]);
    *slope = 2.0 * per * size - by[0] - by[1];
    return per * size * size - l->sign * (from - to);
}

double kent_hollow_gate(double capacity, const kent_hollow_side side[2])
{
    double by = 0.0;
    const double drop = /* with the valve shut */
        kent_hollow_head(&side[0], 0.0, &by) - kent_hollow_head(&side[1], 0.0, &by);
    if (!(capacity > 0.0) || drop == 0.0) return 0.0;
    const law l = {.gap = gate_gap,
                   .side = side,
                   .capacity = capacity,
                   .sign = copysign(1.0, drop)};
    return l.sign * find_flow(&l, capacity * sqrt(fabs(drop)));
}

static double draw_gap(const law *l, double flow, double *slope)
{
    double by = 0.0;
    const double head = kent_hollow_head(l->side, flow, &by);
    *slope = 2.0 * l->per_z2 * flow - by;
    return l->z + l->per_z2 * flow * flow - head;
}

double kent_hollow_draw(double flow, double z, double full,
                        const kent_hollow_side *side)
{
    double by = 0.0;
    if (flow <= 0.0 || kent_hollow_head(side, flow, &by) >= z + full) return flow;
    if (kent_hollow_head(side, 0.0, &by) <= z) return 0.0;
    const law l = {
        .gap = draw_gap, .side = side, .z = z, .per_z2 = full / (flow * flow)};
    return find_flow(&l, flow);
}
