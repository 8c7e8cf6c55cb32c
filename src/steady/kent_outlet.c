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

size_t kent_outlet_switch(kent_equations *eq, const double *x, bool one)
{
    const kent_model *m = eq->model;
    size_t changed = 0;

    for (size_t i = 0; i < m->outflow_count; i++) {
        const size_t l = m->valve_count + i;
        kent_link *link = &eq->link[l];
        const double head = x[link->node[0]] - m->points[m->outflows[i].point].at.z;
        const double q = x[eq->nodes + eq->spans + l];
        if (outlet_switch(m, &m->outflows[i], link, head, q)) changed++;
        if (one && changed) break;
    }
    return changed;
}
