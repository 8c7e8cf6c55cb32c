#include "kent_leg_internal.h"
#include "kent_block_internal.h"

#include <assert.h>

static const double PI = 3.14159265358979323846;

/* Below this turn (rad) a thrust along the bisector says nothing about a leg's pull. */
static const double LEAST_TURN = 1e-6;

static const kent_leg_rule RULES[] = {
    {0, 2, "on each leg", KENT_BEND, true, false},
    {2, KENT_PORTS, "on the branch", KENT_TEE, false, false},
    {2, KENT_PORTS, "on the branch", KENT_WYE, false, false},
    {2, KENT_PORTS, "on each branch", KENT_CROSS, false, false},
    {0, 2, "on either leg alone", KENT_REDUCER, false, true},
    {0, 1, "behind the end", KENT_DEAD_END, false, false},
    {0, 2, "on both sides, for a push from either", KENT_VALVE, false, false},
    {0, 0, "nowhere", KENT_STRAIGHT, false, false},
    {0, 0, "nowhere", KENT_CURVE, false, false},
    {0, KENT_PORTS, "on each outer leg", KENT_GROUP, false, false},
};

static const kent_leg_rule TURNED_REDUCER = {0,     2,    "on each leg", KENT_REDUCER,
                                             false, false};

/* Of a tee, wye or cross. */
static const kent_leg_rule SHUT_LEGS = {0,          KENT_PORTS, "on each leg",
                                        KENT_CROSS, false,      false};

const kent_leg_rule *kent_leg_rule_of(const kent_model *m, const kent_fitting *fitting)
{
    const size_t count = sizeof RULES / sizeof RULES[0];
    const kent_fitting_type type = fitting->type;
    const bool branches = type == KENT_TEE || type == KENT_WYE || type == KENT_CROSS;
    size_t i = 0;

    if (type == KENT_REDUCER && fitting->angle > LEAST_TURN) return &TURNED_REDUCER;
    if (branches && kent_fitting_has_shut_legs(m, fitting)) return &SHUT_LEGS;
    while (i + 1 < count && RULES[i].type != type) {
        i++;
    }
    assert(RULES[i].type == type); /* every type has a row */
    return &RULES[i];
}

/* Whether it bears at some depth. */
static bool soil_bears(const kent_soil *soil)
{
    switch (soil->route) {
    case KENT_BEARING_CONSTANT:
        return soil->allowable_bearing > 0.0;
    case KENT_BEARING_BY_DEPTH:
        return soil->by_depth_count > 0 &&
               soil->by_depth[soil->by_depth_count - 1].bearing > 0.0;
    case KENT_BEARING_GRADIENT:
        return soil->bearing_gradient > 0.0;
    case KENT_BEARING_PASSIVE:
        return soil->passive_share > 0.0;
    }
    return false;
}

bool kent_soil_counts(const kent_soil *soil)
{
    return soil != NULL && !soil->unreliable && soil_bears(soil);
}

bool kent_fill_counts(const kent_soil *soil) { return !soil->unreliable; }

const kent_soil *kent_point_soil(const kent_model *m, int point)
{
    const int own = point >= 0 ? m->points[point].soil : -1;
    const int soil = own >= 0 ? own : m->ground.soil;
    return soil >= 0 ? &m->soils[soil] : NULL;
}

bool kent_leg_bears(const kent_fitting *fitting, kent_vec3 thrust)
{
    const double lifted = KENT_BLOCK_NEGLIGIBLE * kent_vec3_length(thrust);

    if (fitting->type != KENT_BEND || fitting->orientation == KENT_CREST) return false;
    return thrust.z <= lifted;
}

/* ---- a tee's run ----------------------------------------------------------------- */

/* What the ground beside a restrained length of the run bears, as far as nothing breaks
 * it. source 11.20 */
static void run_bears(const kent_model *m, const kent_standings *standings,
                      size_t fitting, size_t port, kent_leg_work *w)
{
    const kent_fitting *f = &m->fittings[fitting];
    const kent_port *p = &m->ports[f->port_first + port];
    const double stated = f->stated.run_length[port];

    if (!(stated > 0.0) || p->span < 0) return;
    const kent_leg_walk walk =
        kent_leg_walk_of(m, standings, fitting, p, stated, stated);
    kent_leg_work side = {
        .factor = w->factor,
        .bears = true,
        .side_alone = true,
        .demand = INFINITY,
        .limit = walk.reach,
    };
    if (kent_leg_pieces(m, f, p, &side) != 0) {
        w->run_unknown = true;
        return;
    }
    w->run[port] = walk.reach;
    w->run_bearing[port] = side.gives;
}

/* A branch square to its run, pushed level or down, presses the run's side. Not where
 * legs can be shut: it is pushed along the run too. */
static void run_credit(const kent_model *m, const kent_standings *standings,
                       size_t fitting, kent_vec3 thrust, kent_leg_work *w)
{
    const kent_fitting *f = &m->fittings[fitting];
    const double lifted = KENT_BLOCK_NEGLIGIBLE * kent_vec3_length(thrust);

    if (f->type != KENT_TEE || thrust.z > lifted) return;
    if (kent_fitting_has_shut_legs(m, f)) return;
    for (size_t k = 0; k < 2; k++) {
        run_bears(m, standings, fitting, k, w);
    }
    w->credit = m->rules.run_share * (w->run_bearing[0] + w->run_bearing[1]);
}

/* ---- one leg --------------------------------------------------------------------- */

/* The other form's length beside the one that sizes. A bend that the side of the trench
 * does not help has one length by both; what is no bend, or turns back, has none by the
 * second. */
static void leg_forms(const kent_model *m, const kent_fitting *fitting,
                      const kent_port *port, kent_leg_work *w)
{
    const kent_length_form other =
        w->form == KENT_FORM_ETL ? KENT_FORM_HANDBOOK : KENT_FORM_ETL;
    kent_leg_work beside = *w;

    w->by_form[w->form] = w->length;
    if (!w->bend || w->turns_back) return;
    if (!w->bears) {
        w->by_form[other] = w->length;
        return;
    }
    beside.form = other;
    if (kent_leg_pieces(m, fitting, port, &beside) == 0) {
        w->by_form[other] = beside.length;
    }
}

unsigned kent_leg_measure(const kent_model *m, const kent_fitting *fitting,
                          const kent_port *port, kent_leg_work *w)
{
    const unsigned lack = kent_leg_pieces(m, fitting, port, w);

    if (lack == 0) leg_forms(m, fitting, port, w);
    return lack;
}

double kent_leg_gives(const kent_model *m, const kent_fitting *fitting,
                      const kent_leg *leg, double length)
{
    kent_leg_work work = {.factor = leg->factor,
                          .bend = kent_leg_rule_of(m, fitting)->bend,
                          .bears = leg->bears,
                          .form = leg->form,
                          .demand = INFINITY,
                          .limit = length};
    const kent_port *p = &m->ports[fitting->port_first + leg->port];
    return kent_leg_pieces(m, fitting, p, &work) == 0 ? work.gives : NAN;
}

double kent_leg_use(const kent_model *m, const kent_fitting *fitting,
                    const kent_leg *leg)
{
    if (leg->end != KENT_LEG_IN_GROUND || !(leg->length > 0.0)) return 1.0;
    const double use = leg->demand / kent_leg_gives(m, fitting, leg, leg->reach);
    return use < 1.0 ? use : 1.0; /* or not known */
}

unsigned kent_leg_prepare(const kent_model *m, const kent_standings *standings,
                          size_t index, size_t port, kent_vec3 thrust, double factor,
                          kent_leg_work *out)
{
    const kent_fitting *fitting = &m->fittings[index];
    const kent_port *p = &m->ports[fitting->port_first + port];
    const kent_leg_rule *rule = kent_leg_rule_of(m, fitting);
    const double push = kent_vec3_length(thrust);

    *out = (kent_leg_work){.factor = factor,
                           .angle = fitting->angle,
                           .limit = INFINITY,
                           .length = NAN,
                           .by_form = {NAN, NAN}};
    out->bend = rule->bend && fitting->angle > LEAST_TURN;
    out->turns_back = out->bend && fitting->angle > 0.5 * PI + LEAST_TURN;
    out->bears = !out->turns_back && kent_leg_bears(fitting, thrust);
    out->form = out->bears ? m->rules.length_form : KENT_FORM_HANDBOOK;
    if (p->span < 0) return KENT_LACK_PIPE;
    out->pipe = &m->pipes[m->spans[p->span].pipe];

    /* what a resistance of 1 N/m would need as a length, it needs as a force */
    out->force = push;
    if (out->bend) out->force = push / (2.0 * sin(0.5 * fitting->angle)); /* 11.8 */
    run_credit(m, standings, index, thrust, out);
    out->demand =
        out->bend && !out->turns_back
            ? kent_restrained_length_bend(out->force, fitting->angle, factor, 1.0, 0.0)
            : kent_restrained_length_branch(out->force, factor, out->credit, 1.0);
    return kent_leg_measure(m, fitting, p, out);
}
