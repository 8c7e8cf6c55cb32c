/* Whether devices, and the events that move things, are as their structs promise. */
#include "kent_model_internal.h"

#include <math.h>

static bool is_positive(double x) { return x > 0.0 && isfinite(x); }

static bool is_index(int i, size_t count) { return i >= 0 && (size_t)i < count; }

static bool pumps_are_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->pump_count; i++) {
        const kent_pump *p = &m->pumps[i];
        if (p->in_parallel < 1 || p->running < 0 || p->running > p->in_parallel ||
            !is_positive(p->inertia) || !is_positive(p->curve.rated_speed) ||
            !is_positive(p->curve.rated_flow) || !is_positive(p->curve.rated_head) ||
            p->curve.count < 2 || !(p->check_loss >= 0.0) ||
            (p->check_valve == KENT_CHECK_DELAYED && !(p->check_delay >= 0.0)) ||
            (isnan(p->suction_level) != (p->node[0] >= 0))) {
            return false;
        }
    }
    for (size_t i = 0; i < m->state_running_count; i++) {
        const kent_state_running *r = &m->state_running[i];
        if (!is_index(r->pump, m->pump_count) || r->running < 0 ||
            r->running > m->pumps[r->pump].in_parallel) {
            return false;
        }
    }
    return true;
}

static bool valves_are_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->check_valve_count; i++) {
        const kent_check_valve *c = &m->check_valves[i];
        if (!is_positive(c->size) || !(c->loss >= 0.0) || !(c->delay >= 0.0)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->control_valve_count; i++) {
        const kent_control_valve *c = &m->control_valves[i];
        if (!is_positive(c->size) || !is_positive(c->capacity) ||
            !isfinite(c->set_pressure) || !(c->opening_time >= 0.0) ||
            !(c->closure_time >= 0.0)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->relief_valve_count; i++) {
        const kent_relief_valve *r = &m->relief_valves[i];
        if (!is_positive(r->size) || !is_positive(r->capacity) ||
            !(r->full_open_pressure > r->set_pressure) || !(r->opening_time >= 0.0) ||
            !(r->closure_time >= 0.0) || !isfinite(r->discharge_level) ||
            r->low_set_pressure >= r->set_pressure ||
            (!isnan(r->low_set_pressure) && !(r->hold_time >= 0.0))) {
            return false;
        }
    }
    for (size_t i = 0; i < m->air_valve_count; i++) {
        const kent_air_valve *a = &m->air_valves[i];
        if (a->in_parallel < 1 || !is_positive(a->admission_orifice) ||
            !is_positive(a->release_orifice) ||
            !is_positive(a->admission_coefficient) ||
            !is_positive(a->release_coefficient) ||
            isnan(a->switch_pressure) != isnan(a->switched_orifice)) {
            return false;
        }
    }
    return true;
}

static bool tanks_are_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->surge_tank_count; i++) {
        const kent_surge_tank *t = &m->surge_tanks[i];
        if (!is_positive(t->area) || !is_positive(t->connection_diameter) ||
            !(t->loss_in >= 0.0) || !(t->loss_out >= 0.0) ||
            !isfinite(t->bottom_level) || !(t->overflow_level > t->bottom_level)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->one_way_tank_count; i++) {
        const kent_one_way_tank *t = &m->one_way_tanks[i];
        if (!is_positive(t->area) || !is_positive(t->connection_diameter) ||
            !(t->loss_out >= 0.0) || !isfinite(t->level) ||
            !(t->level > t->bottom_level)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->air_vessel_count; i++) {
        const kent_air_vessel *v = &m->air_vessels[i];
        if (!is_positive(v->gas_volume) || !(v->gas_volume < v->total_volume) ||
            !(v->polytropic_exponent >= 1.0) || !(v->area > 0.0) ||
            !is_positive(v->connection_diameter) || !(v->loss_in >= 0.0) ||
            !(v->loss_out >= 0.0)) {
            return false;
        }
    }
    return true;
}

static bool list_is_valid(const kent_model *m)
{
    size_t stands = 0;
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        const bool in_line = kent_device_in_line(d->kind);
        for (int side = 0; side < 2; side++) {
            const bool none = in_line ? side == 0 && d->kind == KENT_DEVICE_PUMP
                                      : side == 1; /* there may, there has to be */
            if (d->node[side] == -1 ? !none
                                    : (!is_index(d->node[side], m->node_count) ||
                                       m->nodes[d->node[side]].point != d->point)) {
                return false;
            }
        }
    }
    for (size_t n = 0; n < m->node_count; n++) {
        const kent_node *node = &m->nodes[n];
        if (node->stand_first != stands) return false;
        stands += node->stand_count;
        for (size_t k = node->stand_first; k < stands && k < m->stand_count; k++) {
            if (!is_index(m->stands[k], m->device_count)) return false;
            const kent_device *d = &m->devices[m->stands[k]];
            if (d->node[0] != (int)n && d->node[1] != (int)n) return false;
        }
    }
    return stands == m->stand_count;
}

static bool without_is_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->without_count; i++) {
        const kent_left_out *out = &m->without[i];
        bool found = false;
        for (size_t k = 0; k < m->device_count && !found; k++) {
            found =
                m->devices[k].kind == out->kind && m->devices[k].index == out->index;
        }
        if (!found || kent_device_in_line(out->kind)) return false;
    }
    return true;
}

bool kent_devices_are_valid(const kent_model *m)
{
    return pumps_are_valid(m) && valves_are_valid(m) && tanks_are_valid(m) &&
           list_is_valid(m) && without_is_valid(m);
}

static size_t targets_of(const kent_model *m, kent_event_kind kind)
{
    switch (kind) {
    case KENT_EVENT_VALVE:
        return m->valve_count;
    case KENT_EVENT_OUTFLOW:
        return m->outflow_count;
    case KENT_EVENT_PUMP:
        return m->pump_count;
    case KENT_EVENT_FIXED_LEVEL:
        return m->fixed_level_count;
    case KENT_EVENT_BURST:
        return m->burst_count;
    }
    return 0;
}

bool kent_event_is_valid(const kent_model *m, const kent_event *e)
{
    if (!is_index(e->target, targets_of(m, e->kind)) || !(e->start_time >= 0.0) ||
        e->law_first > m->law_count || e->law_count > m->law_count - e->law_first) {
        return false;
    }
    if (e->kind == KENT_EVENT_PUMP) {
        if (e->how_many < 0 || e->how_many > m->pumps[e->target].in_parallel) {
            return false;
        }
        return e->action == KENT_TRIP ||
               (e->ramp_time >= 0.0 && (e->action != KENT_RAMP || e->to >= 0.0));
    }
    if (e->kind == KENT_EVENT_BURST &&
        !(is_positive(e->to) && is_positive(e->coefficient))) {
        return false;
    }
    return e->law_count > 0 ? isnan(e->period) || is_positive(e->period)
                            : e->ramp_time >= 0.0 && isfinite(e->to);
}
