/* Pumps, valves, tanks and vessels, as the case has them, in words. */
#include "kent_view.h"

#include <math.h>

typedef struct teller {
    const kent_view *view;
    kent_text *out;
} teller;

static const char *said(const teller *t, kent_kind kind, double si, kent_shown *room)
{
    *room = kent_shown_with_unit(kind, t->view->units, si);
    return room->text;
}

static void tell_pump(const teller *t, const kent_pump *p)
{
    const kent_pump_curve *c = &p->curve;
    kent_shown a, b, d;
    if (p->in_parallel > 1) {
        kent_text_add(t->out, ", %d of %d units run", p->running, p->in_parallel);
    } else if (p->running == 0) {
        kent_text_add(t->out, ", stands still");
    }
    if (p->node[0] < 0) {
        kent_text_add(t->out, ", draws from %s",
                      said(t, KENT_LENGTH, p->suction_level, &a));
    }
    kent_text_add(t->out, "; %s at %s and %s%s,", said(t, KENT_FLOW, c->rated_flow, &a),
                  said(t, KENT_LENGTH, c->rated_head, &b),
                  said(t, KENT_ROTATION, c->rated_speed, &d),
                  p->in_parallel > 1 ? " each" : "");
    kent_text_add(t->out, " specific speed %.1f (rpm, m3/s, m), inertia %s%s",
                  c->specific_speed, said(t, KENT_INERTIA, p->inertia, &a),
                  p->inertia_estimated ? " (estimated)" : "");
    switch (p->check_valve) {
    case KENT_CHECK_NONE:
        kent_text_add(t->out, "; no check valve");
        break;
    case KENT_CHECK_IDEAL:
        kent_text_add(t->out, "; a check valve that shuts as the flow reverses");
        break;
    case KENT_CHECK_DELAYED:
        kent_text_add(t->out, "; a check valve that shuts %.4g s after the reversal",
                      p->check_delay);
        break;
    }
}

static void tell_relief(const teller *t, const kent_relief_valve *v)
{
    kent_shown a, b, c;
    kent_text_add(t->out, ", %s: opens at %s, fully at %s",
                  said(t, KENT_DIAMETER, v->size, &a),
                  said(t, KENT_PRESSURE, v->set_pressure, &b),
                  said(t, KENT_PRESSURE, v->full_open_pressure, &c));
    if (isnan(v->low_set_pressure)) return;
    kent_text_add(t->out, ", and for %.4g s after a fall below %s", v->hold_time,
                  said(t, KENT_PRESSURE, v->low_set_pressure, &a));
}

static void tell_vessel(const teller *t, const kent_air_vessel *v)
{
    kent_shown a, b;
    kent_text_add(t->out, ": %s of gas in %s, exponent %.2f",
                  said(t, KENT_VOLUME, v->gas_volume, &a),
                  said(t, KENT_VOLUME, v->total_volume, &b), v->polytropic_exponent);
}

static void tell_surge_tank(const teller *t, const kent_surge_tank *s)
{
    kent_shown a, b;
    kent_text_add(t->out, ": %s from %s up", said(t, KENT_AREA, s->area, &a),
                  said(t, KENT_LENGTH, s->bottom_level, &b));
    if (isfinite(s->overflow_level)) {
        kent_text_add(t->out, ", overflows at %s",
                      said(t, KENT_LENGTH, s->overflow_level, &a));
    }
}

static void tell_air_valve(const teller *t, const kent_air_valve *v)
{
    kent_shown a, b;
    if (v->in_parallel > 1) kent_text_add(t->out, ", %d units", v->in_parallel);
    kent_text_add(t->out, ": %s in, %s out",
                  said(t, KENT_DIAMETER, v->admission_orifice, &a),
                  said(t, KENT_DIAMETER, v->release_orifice, &b));
    if (isnan(v->switch_pressure)) return;
    kent_text_add(t->out, ", %s from %s inside on",
                  said(t, KENT_DIAMETER, v->switched_orifice, &a),
                  said(t, KENT_PRESSURE, v->switch_pressure, &b));
}

void kent_view_add_device(const kent_view *v, const kent_device *d, kent_text *out)
{
    const kent_model *m = v->model;
    const teller t = {v, out};
    kent_shown a, b;
    kent_text_add(out, "%s", kent_device_word(d->kind));
    if (d->kind == KENT_DEVICE_BURST) {
        kent_text_add(out, " in a scenario");
        return;
    }
    kent_text_add(out, " %s", d->id);
    switch (d->kind) {
    case KENT_DEVICE_PUMP:
        tell_pump(&t, &m->pumps[d->index]);
        break;
    case KENT_DEVICE_CHECK_VALVE:
        kent_text_add(out, ", %s, shuts %.4g s after the flow reverses",
                      said(&t, KENT_DIAMETER, m->check_valves[d->index].size, &a),
                      m->check_valves[d->index].delay);
        break;
    case KENT_DEVICE_CONTROL_VALVE:
        kent_text_add(
            out, ", %s, holds %s %s",
            said(&t, KENT_DIAMETER, m->control_valves[d->index].size, &a),
            said(&t, KENT_PRESSURE, m->control_valves[d->index].set_pressure, &b),
            m->control_valves[d->index].holds == KENT_HOLDS_UPSTREAM ? "upstream"
                                                                     : "downstream");
        break;
    case KENT_DEVICE_SURGE_TANK:
        tell_surge_tank(&t, &m->surge_tanks[d->index]);
        break;
    case KENT_DEVICE_ONE_WAY_TANK:
        kent_text_add(out, ": %s at %s",
                      said(&t, KENT_AREA, m->one_way_tanks[d->index].area, &a),
                      said(&t, KENT_LENGTH, m->one_way_tanks[d->index].level, &b));
        break;
    case KENT_DEVICE_AIR_VESSEL:
        tell_vessel(&t, &m->air_vessels[d->index]);
        break;
    case KENT_DEVICE_RELIEF_VALVE:
        tell_relief(&t, &m->relief_valves[d->index]);
        break;
    case KENT_DEVICE_AIR_VALVE:
        tell_air_valve(&t, &m->air_valves[d->index]);
        break;
    case KENT_DEVICE_BURST:
    case KENT_DEVICE_KINDS:
        break;
    }
    if (!kent_device_in_line(d->kind)) return;
    /* The end of a span at its delivery node says which way it pumps. */
    const kent_node *node = &m->nodes[d->node[1]];
    const kent_end end = m->ends[node->end_first];
    const kent_span *span = &m->spans[end.span];
    const size_t next = span->route_first + (end.side == 0 ? 1 : span->route_count - 2);
    kent_text_add(out, "; flow to %s", kent_view_point(m, m->route[next]));
}
