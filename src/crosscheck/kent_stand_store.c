/* What gives water and takes it: surge tanks, one-way tanks, air vessels, air valves.
 */
#include "kent_passage_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;
/* m: a tank that spills does so within this of its overflow. */
static const double LIP = 1e-3;
/* m3: air valves open with so much air, and shut with half of it. */
static const double FIRST_AIR = 2e-4;

/* ---- tanks and vessels ----------------------------------------------------------- */

/* m: head of the store itself, from its state (level m, or m3 of gas). */
static double own_head(const kent_store_passage *s, double state, double *by_state)
{
    if (!(s->gas.volume > 0.0)) {
        *by_state = 1.0;
        return state;
    }
    const double per_cubic = isinf(s->area) ? 0.0 : 1.0 / s->area;
    const kent_gas_point gas = kent_gas_in(&s->gas, state);
    *by_state = gas.by_volume / s->weight - per_cubic;
    return s->level + (s->gas.volume - state) * per_cubic +
           (gas.pressure - s->barometric) / s->weight;
}

/* 17.21: own head + k q|q| = H; a one-way tank: the greater of what is left open there
 * and the flow, times any resistance, is nil */
static void store_law(const kent_passage *l, double time, const double *u,
                      kent_law *law)
{
    const kent_store_passage *s = &l->is.store;
    const double q = u[KENT_AT_FLOW], state = u[KENT_AT_STATE];
    double by_state = 0.0, by_flow = 0.0;
    const double own = own_head(s, state, &by_state);
    const double k = q > 0.0 ? s->loss_out_of_main : s->loss_into_main;
    (void)time;
    law->f = own + kent_passage_loss(k, q, &by_flow) - u[KENT_AT_HEAD];
    law->by[KENT_AT_FLOW] = by_flow;
    law->by[KENT_AT_HEAD] = -1.0;
    law->by[KENT_AT_STATE] = by_state;
    if (s->one_way && q / s->conductance >= law->f) {
        *law = (kent_law){.f = q / s->conductance,
                          .by = {[KENT_AT_FLOW] = 1.0 / s->conductance}};
    }
    if (s->gas.volume > 0.0) {
        law->rate[0] = -q;
        law->rate_by[0][KENT_AT_FLOW] = -1.0;
        return;
    }
    const double room = (s->overflow - state) / LIP;
    const double share = q > 0.0 ? fmin(fmax(room, 0.0), 1.0) : 1.0;
    law->rate[0] = share * q / s->area;
    law->rate_by[0][KENT_AT_FLOW] = share / s->area;
    if (share > 0.0 && share < 1.0) law->rate_by[0][KENT_AT_STATE] = -q / s->area / LIP;
}

static const kent_passage_ops STORE = {.states = 1, .law = store_law};

/* s2/m5 of K on a connection */
static double loss_of(const kent_stand *stand, double bore, double k)
{
    const double area = 0.25 * PI * bore * bore;
    return k > 0.0 ? k / (2.0 * stand->model->gravity * area * area) : 0.0;
}

static kent_passage *add_store(kent_passages *links, const kent_stand *stand,
                               const kent_store_passage *store)
{
    kent_passage *l = kent_passages_add(links, &STORE, stand->device->id,
                                        (const int[2]){stand->device->node[0], -1});
    if (!l) return NULL;
    l->is.store = *store;
    l->is.store.conductance =
        kent_node_conductance(stand->model, stand->device->node[0]);
    if (!(l->is.store.conductance > 0.0)) l->is.store.conductance = 1e-3;
    l->start[0] = stand->flow;
    return l;
}

/* m: head of a store that passes the steady flow. */
static double steady_head(const kent_stand *stand, const kent_store_passage *s)
{
    const double q = stand->flow;
    const double k = q > 0.0 ? s->loss_out_of_main : s->loss_into_main;
    return stand->head[0] - k * q * fabs(q);
}

kent_status kent_stand_surge_tank(kent_passages *links, const kent_stand *stand,
                                  kent_error *err)
{
    const kent_surge_tank *t = &stand->model->surge_tanks[stand->device->index];
    const kent_store_passage s = {
        .area = t->area,
        .overflow = t->overflow_level,
        .loss_out_of_main = loss_of(stand, t->connection_diameter, t->loss_in),
        .loss_into_main = loss_of(stand, t->connection_diameter, t->loss_out)};
    kent_passage *l = add_store(links, stand, &s);
    if (!l) return kent_error_nomem(err);
    l->start[1] = steady_head(stand, &s);
    return KENT_OK;
}

kent_status kent_stand_one_way_tank(kent_passages *links, const kent_stand *stand,
                                    kent_error *err)
{
    const kent_one_way_tank *t = &stand->model->one_way_tanks[stand->device->index];
    const kent_store_passage s = {
        .area = t->area,
        .overflow = INFINITY,
        .loss_into_main = loss_of(stand, t->connection_diameter, t->loss_out),
        .one_way = true};
    kent_passage *l = add_store(links, stand, &s);
    if (!l) return kent_error_nomem(err);
    l->start[1] = t->level;
    return KENT_OK;
}

kent_status kent_stand_air_vessel(kent_passages *links, const kent_stand *stand,
                                  kent_error *err)
{
    const kent_model *m = stand->model;
    const kent_air_vessel *v = &m->air_vessels[stand->device->index];
    kent_store_passage s = {
        .area = v->area,
        .overflow = INFINITY,
        .loss_out_of_main = loss_of(stand, v->connection_diameter, v->loss_in),
        .loss_into_main = loss_of(stand, v->connection_diameter, v->loss_out),
        .level = isnan(v->water_level) ? m->points[v->point].at.z : v->water_level,
        .barometric = m->barometric,
        .weight = m->water.density * m->gravity};
    s.gas = (kent_gas){m->barometric + s.weight * (steady_head(stand, &s) - s.level),
                       v->gas_volume, v->polytropic_exponent};
    kent_passage *l = add_store(links, stand, &s);
    if (!l) return kent_error_nomem(err);
    l->start[1] = v->gas_volume;
    l->scale[1] = v->gas_volume * s.weight / s.gas.pressure; /* m3 per m of head */
    return KENT_OK;
}

/* ---- air valves ------------------------------------------------------------------ */

enum { AT_VOLUME = KENT_AT_STATE, AT_MASS };

/* Pa absolute of the air under it. */
static double air_pressure(const kent_air_passage *a, const double *u)
{
    return a->heat * u[AT_MASS] / fmax(u[AT_VOLUME], 0.1 * FIRST_AIR);
}

/* 17.22 */
static void air_law(const kent_passage *l, double time, const double *u, kent_law *law)
{
    const kent_air_passage *a = &l->is.air;
    (void)time;
    if (!a->open) {
        law->f = u[KENT_AT_FLOW];
        law->by[KENT_AT_FLOW] = 1.0;
        return;
    }
    const double volume = fmax(u[AT_VOLUME], 0.1 * FIRST_AIR);
    const double p = fmax(air_pressure(a, u), 1.0);
    const double by_mass = a->heat / volume;
    const double by_volume = u[AT_VOLUME] > 0.1 * FIRST_AIR ? -p / volume : 0.0;
    const kent_air_rate air = kent_air_through(&a->orifice, p);
    law->f = u[KENT_AT_HEAD] - a->level - (p - a->orifice.outside) / a->weight;
    law->by[KENT_AT_HEAD] = 1.0;
    law->by[AT_VOLUME] = -by_volume / a->weight;
    law->by[AT_MASS] = -by_mass / a->weight;
    law->rate[0] = -u[KENT_AT_FLOW];
    law->rate_by[0][KENT_AT_FLOW] = -1.0;
    law->rate[1] = air.mass;
    law->rate_by[1][AT_VOLUME] = air.by_pressure * by_volume;
    law->rate_by[1][AT_MASS] = air.by_pressure * by_mass;
}

static void air_watch(const kent_passage *l, double time, const double *u, double *root)
{
    const kent_air_passage *a = &l->is.air;
    const double gauge = a->open ? air_pressure(a, u) - a->orifice.outside : 1.0;
    (void)time;
    root[0] = a->open ? u[AT_VOLUME] - 0.5 * FIRST_AIR : u[KENT_AT_HEAD] - a->level;
    root[1] = a->open && !isinf(a->switch_pressure) ? gauge - a->switch_pressure : 1.0;
    root[2] = a->open && a->orifice.out != a->release ? gauge : 1.0;
}

static void air_cross(kent_passage *l, double time, double *u, size_t root, bool rising)
{
    kent_air_passage *a = &l->is.air;
    (void)time;
    if (root == 1) {
        if (rising) a->orifice.out = a->switched; /* till it shuts, or lets in */
    } else if (root == 2) {
        if (!rising) a->orifice.out = a->release;
    } else if (!rising) {
        a->open = !a->open;
        a->orifice.out = a->release;
        u[AT_VOLUME] = a->open ? FIRST_AIR : 0.0;
        u[AT_MASS] = a->open ? a->orifice.outside * FIRST_AIR / a->heat : 0.0;
    }
}

static const kent_passage_ops AIR = {
    .states = 2,
    .roots = 3,
    .law = air_law,
    .watch = air_watch,
    .cross = air_cross,
};

static double area_of(double coefficient, double diameter, int count)
{
    return coefficient * count * 0.25 * PI * diameter * diameter;
}

kent_status kent_stand_air_valve(kent_passages *links, const kent_stand *stand,
                                 kent_error *err)
{
    const kent_model *m = stand->model;
    const kent_air_valve *v = &m->air_valves[stand->device->index];
    const int node[2] = {v->node, -1};
    const int n = v->in_parallel;
    const double release = area_of(v->release_coefficient, v->release_orifice, n);
    const bool switches = !isnan(v->switched_orifice);
    kent_passage *l = kent_passages_add(links, &AIR, v->id, node);
    if (!l) return kent_error_nomem(err);
    l->is.air = (kent_air_passage){
        .orifice = {area_of(v->admission_coefficient, v->admission_orifice, n), release,
                    m->barometric, m->water.temperature},
        .release = release,
        .switched = switches ? area_of(v->release_coefficient, v->switched_orifice, n)
                             : release,
        .switch_pressure = switches ? v->switch_pressure : (double)INFINITY,
        .level = m->points[v->point].at.z,
        .weight = m->water.density * m->gravity,
        .heat = KENT_AIR_GAS_CONSTANT * m->water.temperature};
    l->scale[1] = l->scale[2] = 1e-5; /* one unknown among many */
    return KENT_OK;
}
