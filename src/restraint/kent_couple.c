#include "kent_holding_internal.h"

/* m: from the middle of a group to the outside of its furthest member. */
static double group_reach(const kent_model *m, const kent_fitting *group)
{
    double furthest = 0.0;

    for (size_t i = 0; i < group->member_count; i++) {
        const kent_vec3 at = m->points[m->members[group->member_first + i]].at;
        furthest = fmax(furthest, kent_vec3_length(kent_vec3_sub(at, group->at)));
    }
    return furthest + 0.5 * group->outside_diameter;
}

static void couple_take(const kent_model *m, const kent_fitting *group, double reach,
                        const kent_instant *at, size_t number, kent_couple *out)
{
    const double couple = kent_vec3_length(kent_instant_couple(m, group, at));
    const double force = kent_vec3_length(kent_instant_lasting(at));

    if (!(couple > KENT_HOLDING_LEAST * group->outside_diameter)) {
        if (!isnan(couple)) return;
        out->largest = NAN;
        out->apart = true;
        return;
    }
    if (!(couple <= force * reach)) out->apart = true;
    if (couple <= out->largest) return;
    out->largest = couple;
    out->governing = number;
}

kent_couple kent_couple_find(const kent_model *m, const kent_fitting *group,
                             const kent_fitting_loads *loads)
{
    const double reach = group_reach(m, group);
    kent_couple out = {0};

    if (group->type != KENT_GROUP) return out;
    for (size_t i = 0; i < loads->count && !isnan(out.largest); i++) {
        const kent_load_case *c = &loads->cases[i];
        const kent_instant *at[] = {&c->worst[KENT_RESULTANT], &c->highest, &c->lowest};
        for (size_t k = 0; k < sizeof at / sizeof at[0] && !isnan(out.largest); k++) {
            if (at[k]->set) couple_take(m, group, reach, at[k], i, &out);
        }
    }
    return out;
}

/* N: of the member at one port's point, by all ports there. */
static double member_thrust(const kent_model *m, const kent_fitting *group,
                            const kent_instant *at, size_t port)
{
    const kent_port *ports = &m->ports[group->port_first];
    const int point = kent_port_point(m, group, &ports[port]);
    kent_vec3 sum = {0.0, 0.0, 0.0};

    for (size_t k = 0; k < group->port_count; k++) {
        if (kent_port_point(m, group, &ports[k]) != point) continue;
        const double push = at->balance.port[k].push;
        sum = kent_vec3_sub(sum, kent_vec3_scale(push, ports[k].direction));
    }
    return kent_vec3_length(sum);
}

double kent_couple_alone(const kent_model *m, const kent_fitting *group,
                         const kent_fitting_loads *loads)
{
    double most = 0.0;

    if (group->type != KENT_GROUP || !group->parted) return most;
    for (size_t i = 0; i < loads->count; i++) {
        const kent_load_case *c = &loads->cases[i];
        const kent_instant *at[] = {&c->worst[KENT_RESULTANT], &c->highest};
        for (size_t k = 0; k < sizeof at / sizeof at[0]; k++) {
            for (size_t p = 0; at[k]->set && p < group->port_count; p++) {
                const double thrust = member_thrust(m, group, at[k], p);
                most = fmax(most, c->safety_factor * thrust);
            }
        }
    }
    return most;
}
