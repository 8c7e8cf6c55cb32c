/* Pipes behind restrained joints: whether they are rated for what comes, and the stress
 * that the thrust leaves along their walls. */
#include "kent_pull_internal.h"
#include "kent_said.h"

#include <math.h>
#include <stdio.h>

static bool held_by_joints(const kent_holding *h)
{
    const bool joints =
        h->chosen == KENT_RESTRAINED_JOINTS || h->chosen == KENT_BLOCK_AND_JOINTS;
    return joints && h->leg_count > 0;
}

/* ---- ratings --------------------------------------------------------------------- */

/* Which rating of a pipe a kind of case asks. */
static kent_rating rating_asked(const kent_load_case *c)
{
    switch (c->kind) {
    case KENT_CASE_TEST:
        return KENT_RATING_TEST;
    case KENT_CASE_RECURRING:
        return KENT_RATING_RECURRING;
    case KENT_CASE_OCCASIONAL:
    case KENT_CASE_EXCEPTIONAL:
        return KENT_RATING_SURGE;
    case KENT_CASE_STATIC:
    case KENT_CASE_STEADY:
    case KENT_CASE_SHUT_OFF:
    case KENT_CASE_SUCTION:
        break;
    }
    return KENT_RATING_SERVICE;
}

/* Pa, the highest of all senses; NAN: none set. */
static double pressure_of(const kent_load_case *c)
{
    double highest = NAN;

    for (int s = 0; s < KENT_SENSES; s++) {
        if (c->worst[s].set) highest = fmax(highest, c->worst[s].pressure);
    }
    return highest;
}

static void judge(const kent_model *m, const kent_pipe *p, const kent_load_case *c,
                  const char *what, double rating, const char *key, kent_holding *h)
{
    const double pressure = pressure_of(c);
    const kent_said reached = kent_said_of(KENT_PRESSURE, m->units, pressure);

    if (!(pressure > 0.0)) return;
    if (isnan(rating)) {
        kent_notes_add(&h->cautions,
                       "no rating is stated for %s of pipe \"%s\", which must carry %s "
                       "before any factor in '%s': give its %s",
                       what, p->id, reached.s, c->title.s, key);
    } else if (pressure > rating * (1.0 + 1e-9)) {
        kent_notes_add(&h->cautions,
                       "%s of pipe \"%s\" are rated for %s, and '%s' brings %s before "
                       "any factor: restrained they pull apart or break; use some that "
                       "are rated for it",
                       what, p->id, kent_said_of(KENT_PRESSURE, m->units, rating).s,
                       c->title.s, reached.s);
    }
}

/* A test without a rating of its own for it goes by what its joints are rated for. */
static void judge_pipe(const kent_model *m, const kent_pipe *p, const kent_load_case *c,
                       kent_holding *h)
{
    const kent_rating asked = rating_asked(c);
    const double wall = kent_pipe_rating(p, asked);

    judge(m, p, c, "the restrained joints", p->joint_rating, "joint_rating", h);
    if (asked == KENT_RATING_TEST && isnan(wall)) return;
    judge(m, p, c, "the walls", wall, "pressure_rating", h);
}

void kent_pull_ratings(const kent_model *m, const kent_fitting *f,
                       const kent_fitting_loads *loads, kent_holding *h)
{
    if (!held_by_joints(h) || h->needs_nothing || h->governing < 0) return;
    for (size_t i = 0; i < h->leg_count; i++) {
        const kent_port *port = &m->ports[f->port_first + h->legs[i].port];
        const kent_pipe *p = &m->pipes[m->spans[port->span].pipe];
        judge_pipe(m, p, &loads->cases[h->governing], h);
        for (size_t k = 0; k < loads->count; k++) {
            const kent_load_case *c = &loads->cases[k];
            if (c->kind != KENT_CASE_TEST || (int)k == h->governing) continue;
            judge_pipe(m, p, c, h);
        }
    }
}

/* ---- stress ---------------------------------------------------------------------- */

static void derive_stress(const kent_model *m, const kent_port *port,
                          const kent_pull_leg *leg, kent_derivation *d)
{
    const kent_pipe *p = &m->pipes[m->spans[port->span].pipe];
    const kent_source listed = p->pipe_class[0] ? KENT_CATALOGUE : KENT_GIVEN;
    char says[160];

    (void)snprintf(says, sizeof says, "Stress along the wall of pipe \"%s\"%s%s", p->id,
                   port->toward >= 0 ? ", towards " : "",
                   port->toward >= 0 ? m->points[port->toward].id : "");
    kent_derivation_heading(d, says);
    kent_derivation_put(d, "Sw", leg->pull, KENT_FORCE, KENT_COMPUTED,
                        "pull on that leg, before any factor");
    kent_derivation_put(d, "OD", p->outside_diameter, KENT_DIAMETER, listed,
                        "outside diameter");
    kent_derivation_put(d, "e", p->wall, KENT_DIAMETER, listed, "wall, nominal");
    kent_derivation_work(d, "sw", leg->stress, KENT_STRESS, "Sw/(pi*(OD - e)*e)",
                         "23.11", "stress along the wall, next to the fitting");
}

void kent_pull_legs(const kent_model *m, size_t fitting, kent_holding *h,
                    kent_pull_leg *legs, size_t *count)
{
    const kent_fitting *f = &m->fittings[fitting];

    if (!held_by_joints(h) || h->needs_nothing) return;
    for (size_t i = 0; i < h->leg_count; i++) {
        const kent_port *port = &m->ports[f->port_first + h->legs[i].port];
        const kent_pipe *p = &m->pipes[m->spans[port->span].pipe];
        kent_pull_leg *leg = &legs[(*count)++];
        *leg = (kent_pull_leg){
            .fitting = fitting,
            .port = h->legs[i].port,
            .pull = h->legs[i].pull,
            .stress = h->legs[i].pull / kent_pull_wall_area(p), /* 23.11 */
        };
        if (!isnan(leg->stress)) derive_stress(m, port, leg, &h->derivation);
    }
}
