#include "kent_model_internal.h"

#include <math.h>
#include <stdlib.h>

static bool is_positive(double x) { return x > 0.0 && isfinite(x); }

static bool is_index(int i, size_t count) { return i >= 0 && (size_t)i < count; }

static bool is_index_or_none(int i, size_t count)
{
    return i == -1 || is_index(i, count);
}

static bool is_part(size_t first, size_t count, size_t whole)
{
    return first <= whole && count <= whole - first;
}

static bool pipes_are_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->route_count; i++) {
        if (!is_index(m->route[i], m->point_count)) return false;
    }
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *p = &m->pipes[i];
        if (p->route_count < 2 ||
            !is_part(p->route_first, p->route_count, m->route_count) ||
            !is_positive(p->inside_diameter) || !(p->loss >= 0.0) ||
            !(p->joint_deflection >= 0.0) || !(p->friction_coefficient >= 0.0) ||
            !is_positive(p->derating) ||
            !is_part(p->creep_first, p->creep_count, m->creep_count)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->point_count; i++) {
        if (!isfinite(m->points[i].at.z) ||
            !is_index_or_none(m->points[i].soil, m->soil_count)) {
            return false;
        }
    }
    return true;
}

static bool devices_are_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        const kent_fixed_level *f = &m->fixed_levels[i];
        if (!is_index(f->point, m->point_count) || !is_index(f->node, m->node_count) ||
            !isfinite(f->level) || !(f->loss >= 0.0)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        const kent_outflow *o = &m->outflows[i];
        if (!is_index(o->point, m->point_count) || !is_index(o->node, m->node_count) ||
            !isfinite(o->flow) ||
            (o->pressure_dependent && !is_positive(o->full_pressure))) {
            return false;
        }
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_valve *v = &m->valves[i];
        const bool in_line = isnan(v->discharge_level);
        if (!is_index(v->point, m->point_count) ||
            !is_index(v->node[0], m->node_count) ||
            (in_line ? !is_index(v->node[1], m->node_count) : v->node[1] != -1) ||
            !is_positive(v->size) || !(v->opening >= 0.0 && v->opening <= 1.0) ||
            (isnan(v->capacity) ? isnan(v->flow) : !is_positive(v->capacity))) {
            return false;
        }
    }
    return true;
}

static bool are_indices(const int *list, size_t count, size_t whole)
{
    for (size_t i = 0; i < count; i++) {
        if (!is_index(list[i], whole)) return false;
    }
    return true;
}

static bool is_trench_or_none(int trench)
{
    return is_index_or_none(trench, KENT_TRENCHES);
}

static bool ground_is_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->ground_zone_count; i++) {
        const kent_ground_zone *z = &m->ground_zones[i];
        if (!is_index(z->pipe, m->pipe_count) || !(z->from < z->to) ||
            !is_index_or_none(z->soil, m->soil_count) ||
            !is_index_or_none(z->backfill, m->soil_count) ||
            !is_trench_or_none(z->trench)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->soil_count; i++) {
        const kent_soil *s = &m->soils[i];
        if (s->by_depth_count > KENT_DEPTH_ROWS || !(s->factor_inside >= 1.0)) {
            return false;
        }
    }
    return is_index_or_none(m->ground.soil, m->soil_count) &&
           is_index_or_none(m->ground.backfill, m->soil_count) &&
           is_trench_or_none(m->ground.trench) &&
           are_indices(m->zone_order, m->ground_zone_count, m->ground_zone_count);
}

static bool states_are_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->state_count; i++) {
        const kent_state *s = &m->states[i];
        if (!is_part(s->level_first, s->level_count, m->state_level_count) ||
            !is_part(s->running_first, s->running_count, m->state_running_count) ||
            !(s->outflow_factor >= 0.0) || !is_positive(s->roughness_factor)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->state_level_count; i++) {
        const kent_state_level *l = &m->state_levels[i];
        if (!is_index(l->fixed_level, m->fixed_level_count) || !isfinite(l->level)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->march_count; i++) {
        if (!is_index(m->marches[i].scenario, m->scenario_count) ||
            !is_index(m->marches[i].state, m->state_count)) {
            return false;
        }
    }
    return are_indices(m->scenario_states, m->scenario_state_count, m->state_count);
}

static bool scenarios_are_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->scenario_count; i++) {
        const kent_scenario *s = &m->scenarios[i];
        if (!is_positive(s->duration) ||
            !is_part(s->event_first, s->event_count, m->event_count) ||
            !is_part(s->state_first, s->state_count, m->scenario_state_count) ||
            !is_part(s->without_first, s->without_count, m->without_count) ||
            !is_index_or_none(s->same_as, m->scenario_count)) {
            return false;
        }
    }
    for (size_t i = 0; i < m->event_count; i++) {
        if (!kent_event_is_valid(m, &m->events[i])) return false;
    }
    return true;
}

static bool spans_are_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *s = &m->spans[i];
        if (!is_index(s->pipe, m->pipe_count) || s->route_count < 2 ||
            !is_part(s->route_first, s->route_count, m->route_count) ||
            !is_index(s->node[0], m->node_count) ||
            !is_index(s->node[1], m->node_count) || !is_positive(s->length) ||
            !is_positive(s->bore) || !is_positive(s->area) ||
            !is_positive(s->wave_speed) || !(s->loss >= 0.0) ||
            !is_positive(s->friction.bore) || !is_positive(s->friction.gravity) ||
            !is_positive(s->friction.kinematic_viscosity)) {
            return false;
        }
        for (int side = 0; side < 2; side++) {
            const size_t stop = s->route_first + (side ? s->route_count - 1 : 0);
            if (m->nodes[s->node[side]].point != m->route[stop]) return false;
        }
    }
    return true;
}

/* Every end of every span in just one node's list, and there with good reason. */
static bool nodes_are_valid(const kent_model *m)
{
    size_t ends = 0;
    for (size_t n = 0; n < m->node_count; n++) {
        const kent_node *node = &m->nodes[n];
        if (!is_index(node->point, m->point_count) || node->end_count == 0 ||
            node->end_first != ends ||
            !is_part(node->end_first, node->end_count, 2 * m->span_count) ||
            (node->kind == KENT_NODE_JUNCTION) != (node->device == -1)) {
            return false;
        }
        for (size_t e = 0; e < node->end_count; e++) {
            const kent_end end = m->ends[node->end_first + e];
            if (!is_index(end.span, m->span_count) ||
                (end.side != 0 && end.side != 1) ||
                m->spans[end.span].node[end.side] != (int)n) {
                return false;
            }
        }
        ends += node->end_count;
    }
    return ends == 2 * m->span_count;
}

static bool port_is_valid(const kent_model *m, const kent_port *p)
{
    const double rounding = 1.0e-9;
    if (!(fabs(kent_vec3_length(p->direction) - 1.0) < rounding) ||
        !is_positive(p->inside_diameter) || !is_positive(p->seal_diameter) ||
        !(p->face >= 0.0)) {
        return false;
    }
    if (p->kind != KENT_PORT_SPAN) {
        return p->span == -1 && isfinite(p->pressure + p->flow);
    }
    if (!is_index(p->span, m->span_count)) return false;
    const kent_span *span = &m->spans[p->span];
    return p->chainage >= 0.0 && p->chainage <= span->length &&
           fabs(p->sign) - 1.0 == 0.0 && is_index(p->toward, m->point_count);
}

static bool stated_is_valid(const kent_model *m, const kent_stated *s)
{
    const kent_slope *slope = &s->slope;
    const bool falls =
        isnan(slope->angle) ||
        (slope->angle >= 0.0 && kent_vec3_length(slope->direction) > 0.0);
    const bool shared =
        isnan(s->block_share) || (s->block_share > 0.0 && s->block_share <= 1.0);
    return falls && shared &&
           is_part(s->closes_first, s->closes_count, m->closes_count) &&
           !(s->run_length[0] < 0.0) && !(s->run_length[1] < 0.0) &&
           (isnan(s->contact_area) || is_positive(s->contact_area));
}

static bool fittings_are_valid(const kent_model *m)
{
    for (size_t i = 0; i < m->fitting_count; i++) {
        const kent_fitting *f = &m->fittings[i];
        if (!is_index_or_none(f->point, m->point_count) ||
            !is_index_or_none(f->soil, m->soil_count) ||
            !is_index_or_none(f->valve, m->valve_count) ||
            !is_index_or_none(f->device, m->device_count) || f->port_count == 0 ||
            !is_part(f->port_first, f->port_count, m->port_count) ||
            !is_part(f->member_first, f->member_count, m->member_count) ||
            !is_part(f->obstacle_first, f->obstacle_count, m->obstacle_count) ||
            !is_index_or_none(f->zone, m->ground_zone_count) ||
            !is_trench_or_none(f->trench) ||
            !is_index_or_none(f->backfill, m->soil_count) ||
            (f->type == KENT_GROUP) > (f->member_count >= 2) ||
            !stated_is_valid(m, &f->stated) || !isfinite(f->angle + f->weight)) {
            return false;
        }
        for (size_t k = 0; k < f->port_count; k++) {
            if (!port_is_valid(m, &m->ports[f->port_first + k])) return false;
        }
    }
    return true;
}

static bool loads_are_valid(const kent_model *m)
{
    const kent_loads *l = &m->loads;
    for (size_t i = 0; i < sizeof l->bearing_increase / sizeof l->bearing_increase[0];
         i++) {
        if (!(l->bearing_increase[i] >= 1.0)) return false;
    }
    return is_index_or_none(l->test_gauge, m->point_count) &&
           is_index_or_none(l->future_gauge, m->point_count) && !(l->cooling < 0.0);
}

bool kent_model_is_valid(const kent_model *m)
{
    return is_positive(m->water.density) && is_positive(m->water.bulk_modulus) &&
           is_positive(m->water.viscosity) && is_positive(m->gravity) &&
           is_positive(m->barometric) && loads_are_valid(m) &&
           are_indices(m->members, m->member_count, m->point_count) &&
           are_indices(m->together, m->together_count, m->point_count) &&
           are_indices(m->closes, m->closes_count, m->point_count) &&
           ground_is_valid(m) && states_are_valid(m) && pipes_are_valid(m) &&
           devices_are_valid(m) && kent_devices_are_valid(m) &&
           scenarios_are_valid(m) && spans_are_valid(m) && nodes_are_valid(m) &&
           fittings_are_valid(m);
}
