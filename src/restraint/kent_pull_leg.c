/* Pipes behind restrained joints: whether they are rated for what comes, and the stress
 * that the thrust leaves along their walls. */
#include "kent_along.h"
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

/* Pa, the highest of all senses, and of a march; NAN: none set. */
static double pressure_of(const kent_load_case *c)
{
    double highest = c->highest.set ? c->highest.pressure : NAN;

    for (int s = 0; s < KENT_SENSES; s++) {
        if (c->worst[s].set) highest = fmax(highest, c->worst[s].pressure);
    }
    return highest;
}

/* A part of the pipe that restrained joints hand the thrust on to. */
typedef enum rated_part { RATED_JOINTS, RATED_WALLS } rated_part;

static double rating_of(const kent_pipe *p, rated_part part, const kent_load_case *c)
{
    return part == RATED_JOINTS ? p->joint_rating
                                : kent_pipe_rating(p, rating_asked(c));
}

/* The case that comes nearest to a rating that is known, or goes furthest beyond it;
 * or among those for which none is known the one with the highest pressure. A test
 * without a rating of its own for it goes by what the joints are rated for. NULL: none.
 */
static const kent_load_case *harshest(const kent_pipe *p, rated_part part, bool known,
                                      const kent_fitting_loads *loads)
{
    const kent_load_case *worst = NULL;
    double most = 0.0;

    for (size_t k = 0; k < loads->count; k++) {
        const kent_load_case *c = &loads->cases[k];
        const double rating = rating_of(p, part, c), pressure = pressure_of(c);
        const double asks = known ? pressure / rating : pressure;
        const bool test = part == RATED_WALLS && c->kind == KENT_CASE_TEST;
        if (isnan(rating) == known || (test && !known) || !(asks > most)) continue;
        most = asks;
        worst = c;
    }
    return worst;
}

static void judge_part(const kent_model *m, const kent_pipe *p, rated_part part,
                       const kent_fitting_loads *loads, kent_holding *h)
{
    const kent_load_case *unrated = harshest(p, part, false, loads);
    const kent_load_case *rated = harshest(p, part, true, loads);
    const char *what = part == RATED_JOINTS ? "the restrained joints" : "the walls";

    if (unrated) {
        kent_notes_add(&h->cautions,
                       "no rating is stated for %s of pipe \"%s\", which must carry %s "
                       "before any factor in '%s': give its %s",
                       what, p->id,
                       kent_said_of(KENT_PRESSURE, m->units, pressure_of(unrated)).s,
                       unrated->title.s,
                       part == RATED_JOINTS ? "joint_rating" : "pressure_rating");
    }
    if (!rated) return;
    const double rating = rating_of(p, part, rated), pressure = pressure_of(rated);
    if (!(pressure > rating * (1.0 + 1e-9))) return;
    kent_notes_warn(&h->cautions,
                    "%s of pipe \"%s\" are rated for %s, and '%s' brings %s before "
                    "any factor: restrained they pull apart or break; use some that "
                    "are rated for it",
                    what, p->id, kent_said_of(KENT_PRESSURE, m->units, rating).s,
                    rated->title.s, kent_said_of(KENT_PRESSURE, m->units, pressure).s);
}

/* Every pipe that the leg runs along. */
static void judge_leg(const kent_model *m, const kent_port *port, double reach,
                      const kent_fitting_loads *loads, kent_holding *h)
{
    kent_along way = kent_along_of(m, port);
    double left = reach;

    do {
        const kent_pipe *p = &m->pipes[way.pipe];
        const bool walls = p->joint == KENT_FUSED || p->joint == KENT_WELDED;
        if (!walls || !isnan(p->joint_rating)) judge_part(m, p, RATED_JOINTS, loads, h);
        judge_part(m, p, RATED_WALLS, loads, h);
        left -= kent_along_left(m, way);
    } while (left > KENT_SAME_PLACE && kent_along_on(m, way, &way));
}

void kent_pull_ratings(const kent_model *m, const kent_fitting *f,
                       const kent_fitting_loads *loads, kent_holding *h)
{
    if (!held_by_joints(h) || h->needs_nothing) return;
    for (size_t i = 0; i < h->leg_count; i++) {
        const kent_leg *leg = &h->legs[i];
        judge_leg(m, &m->ports[f->port_first + leg->port], leg->reach, loads, h);
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
