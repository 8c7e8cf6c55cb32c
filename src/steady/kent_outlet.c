#include "kent_outlet_internal.h"

/* m. An outflow that draws all keeps doing so this far below the head it asks for, so
 * that rounding does not send it back and forth. */
static const double SLACK = 1e-10;

/* Law of an outflow that draws part of its flow. */
static kent_link_law part_law(const kent_outflow *o)
{
    return o->pressure_dependent ? KENT_LINK_LOSS : KENT_LINK_HEAD;
}

/* m of pressure head that an outflow asks for to draw all. */
static double full_head(const kent_model *m, const kent_outflow *o)
{
    if (!o->pressure_dependent) return 0.0;
    return o->full_pressure / (m->water.density * m->gravity);
}

/* Moves one outflow to the law that the solution calls for; whether it moved. head: m
 * of pressure head there. q: m3/s it draws in the solution. */
static bool outlet_switch(const kent_model *m, const kent_outflow *o, kent_link *link,
                          double head, double q)
{
    const kent_link before = *link;

    if (o->flow <= 0.0) return false;  /* what flows in is pumped: always all */
    if (link->law != KENT_LINK_FLOW) { /* draws part */
        if (q < 0.0 || q > o->flow) {
            link->law = KENT_LINK_FLOW;
            link->flow = q < 0.0 ? 0.0 : o->flow;
        }
    } else if (link->flow > 0.0) { /* draws all */
        if (head < full_head(m, o) - SLACK) link->law = part_law(o);
    } else if (head > SLACK) { /* draws nothing */
        link->law = part_law(o);
    }
    return link->law != before.law;
}

bool kent_outlet_switch(kent_equations *eq, const double *x, size_t outflow)
{
    const kent_model *m = eq->model;
    const kent_outflow *o = &m->outflows[outflow];
    const size_t l = eq->first_outflow + outflow;
    const double head = x[o->node] - m->points[o->point].at.z;
    return outlet_switch(m, o, &eq->link[l], head, x[eq->nodes + eq->spans + l]);
}

bool kent_outlet_loosen(kent_equations *eq, size_t outflow)
{
    const kent_outflow *o = &eq->model->outflows[outflow];
    kent_link *link = &eq->link[eq->first_outflow + outflow];
    if (o->flow <= 0.0 || link->law != KENT_LINK_FLOW) return false;
    link->law = part_law(o);
    return true;
}
