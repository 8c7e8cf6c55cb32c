#include "kent_link_internal.h"

#include <math.h>

/* Of a pump whose curve is flat or rises, in the derivative only: this share of rated
 * head over rated flow, so that pumps side by side have a single answer. */
static const double LEAST_FALL = 1e-6;

kent_link kent_link_of_valve(const kent_valve *v)
{
    const double share = kent_valve_relative_capacity(&v->curve, v->opening);
    const double capacity = v->capacity * share; /* m^2.5/s; NAN: by flow */
    kent_link link = {.law = KENT_LINK_FLOW,
                      .node = {v->node[0], v->node[1]},
                      .level = v->discharge_level};
    if (isnan(v->capacity)) {
        link.flow = v->flow;
    } else if (capacity > 0.0) { /* else closed: no flow */
        link.law = KENT_LINK_LOSS;
        link.resistance = 1.0 / (capacity * capacity);
    }
    return link;
}

/* A dependent outflow between none and all is an orifice at the level of its point,
 * since p/full = (q/Q)^2. (6.8) */
kent_link kent_link_of_outflow(const kent_model *m, const kent_outflow *o)
{
    kent_link link = {.law = KENT_LINK_FLOW,
                      .node = {o->node, -1},
                      .flow = o->flow,
                      .level = m->points[o->point].at.z};
    if (o->pressure_dependent && o->flow > 0.0) {
        const double full_head = o->full_pressure / (m->water.density * m->gravity);
        link.law = KENT_LINK_LOSS;
        link.resistance = full_head / (o->flow * o->flow);
    }
    return link;
}

double kent_link_start(const kent_link *link, double scale)
{
    switch (link->law) {
    case KENT_LINK_FLOW:
        return link->flow;
    case KENT_LINK_PUMP:
        return link->speed > 0.0 ? link->units * link->curve->rated_flow : 0.0;
    case KENT_LINK_HEAD:
    case KENT_LINK_LOSS:
    case KENT_LINK_RELIEF:
        break;
    }
    return scale;
}

bool kent_link_is_flow(const kent_link *link)
{
    return link->law == KENT_LINK_FLOW || link->law == KENT_LINK_RELIEF;
}

static double head_at(const kent_link *link, const double *h, int side)
{
    return link->node[side] >= 0 ? h[link->node[side]] : link->level;
}

/* Head of one unit and its slope by flow. A pump that runs is nowhere let stand with
 * water running back through it; a straight line, steep and without a turn, brings a
 * search back from there. */
static double lift_of_one(const kent_link *link, double of_one, double *slope)
{
    const kent_pump_curve *c = link->curve;
    const double back = link->speed > 0.0 ? fmin(of_one, 0.0) : 0.0;
    const kent_pump_point at = kent_pump_at(c, of_one - back, link->speed);
    const double line = -c->rated_head / c->rated_flow;
    *slope = back < 0.0 ? line : at.head_by_flow;
    return at.head + line * back;
}

double kent_link_lift(const kent_link *link, double q)
{
    const double of_one = q / link->units;
    double slope = 0.0; /* s/m2 */
    return lift_of_one(link, of_one, &slope) - link->resistance * of_one * fabs(of_one);
}

/* Share of its capacity that a relief valve has open, and the root of the head it
 * works under; both go on below and above where they hold, so that a search that
 * strays there finds its way back. */
static double opened(const kent_link *link, double h)
{
    return (h - link->set) / (link->full - link->set);
}

static double root_of_head(const kent_link *link, double h)
{
    return sqrt(fmax(fmax(h, link->set) - link->level, 0.0));
}

double kent_link_residual(const kent_link *link, const double *h, double q)
{
    const double before = head_at(link, h, 0);
    const double behind = head_at(link, h, 1);
    switch (link->law) {
    case KENT_LINK_FLOW:
        return q - link->flow;
    case KENT_LINK_HEAD:
        return head_at(link, h, link->held) - link->level;
    case KENT_LINK_PUMP:
        return before + kent_link_lift(link, q) - behind;
    case KENT_LINK_RELIEF:
        return q - link->capacity * opened(link, before) * root_of_head(link, before);
    case KENT_LINK_LOSS:
        break;
    }
    return before - behind - link->resistance * q * fabs(q);
}

static double pump_slope(const kent_link *link, double q)
{
    const double of_one = q / link->units;
    const double least = LEAST_FALL * link->curve->rated_head / link->curve->rated_flow;
    double slope = 0.0;
    (void)lift_of_one(link, of_one, &slope);
    slope -= 2.0 * link->resistance * fabs(of_one);
    return fmin(slope, -least) / link->units;
}

static double relief_slope(const kent_link *link, double h)
{
    const double root = root_of_head(link, h);
    double by_head = root / (link->full - link->set);
    if (h > link->set && root > 0.0) by_head += 0.5 * opened(link, h) / root;
    return -link->capacity * by_head;
}

void kent_link_derivatives(const kent_link *link, const double *h, double q,
                           double value[3])
{
    value[0] = value[1] = value[2] = 0.0;
    switch (link->law) {
    case KENT_LINK_FLOW:
        value[2] = 1.0;
        break;
    case KENT_LINK_HEAD:
        value[link->held] = 1.0;
        break;
    case KENT_LINK_LOSS:
        value[0] = 1.0;
        value[1] = -1.0;
        value[2] = -2.0 * link->resistance * fabs(q);
        break;
    case KENT_LINK_PUMP:
        value[0] = 1.0;
        value[1] = -1.0;
        value[2] = pump_slope(link, q);
        break;
    case KENT_LINK_RELIEF:
        value[0] = relief_slope(link, head_at(link, h, 0));
        value[2] = 1.0;
        break;
    }
}
