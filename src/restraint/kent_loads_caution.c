/* What its load cases ask to be said of a fitting, beside what pushes other ways. */
#include "kent_holding_internal.h"
#include "kent_said.h"

static const double PI = 3.14159265358979323846;

/* How the thrust would grow on the outside diameter: of the port where most. 1: not. */
static double outside_over_taken(const kent_model *m, const kent_fitting *f)
{
    double most = 1.0;

    for (size_t k = f->port_first; k < f->port_first + f->port_count; k++) {
        const kent_port *p = &m->ports[k];
        const kent_joint joint =
            p->span >= 0 ? m->pipes[m->spans[p->span].pipe].joint : f->branch.joint;
        const bool gasketed = joint == KENT_RESTRAINED || kent_joint_slips(joint);
        const double ratio = p->outside_diameter / p->seal_diameter;
        if (f->point >= 0 && !gasketed) continue; /* its wall pulls, not its joint */
        if (ratio * ratio > most) most = ratio * ratio;
    }
    return most;
}

/* source docs/theory/08-momentum.md, 8.2 */
static void caution_area(const kent_holding_work *w, kent_holding *h)
{
    const double more = outside_over_taken(w->m, w->fitting);
    const bool inside = w->m->loads.thrust_area == KENT_AREA_INSIDE;

    if (w->m->loads.thrust_area == KENT_AREA_OUTSIDE || more <= 1.0 + 1e-9) return;
    kent_notes_warn(&h->cautions,
                    "its thrust is taken on the %s, as thrust_area says; a joint that "
                    "slips is pressed on its outside diameter, with up to %.0f %% more",
                    inside ? "bore" : "nominal size", 100.0 * (more - 1.0));
}

/* The block behind a cap goes with the cap. */
static void caution_end(const kent_holding_work *w, kent_holding *h)
{
    const kent_fitting *f = w->fitting;
    const kent_port *p = &w->m->ports[f->port_first];
    const bool block = h->held && h->block.type != KENT_BLOCK_NONE;
    kent_text t = {0};

    if (f->type != KENT_DEAD_END || !block || p->span < 0) return;
    if (!kent_joint_slips(w->m->pipes[w->m->spans[p->span].pipe].joint)) return;
    kent_text_add(&t, "once this end is opened to lead the main on, its block holds "
                      "nothing and the joints behind slip: ");
    if (h->leg_count > 0) {
        kent_text_add(&t, "restrain them over %s now, or",
                      kent_said_of(KENT_LENGTH, w->m->units, h->restrained_length).s);
    } else {
        kent_text_add(&t, "restrain them now, or");
    }
    kent_text_add(&t, " end the main in a valve that is held from either side");
    kent_notes_add(&h->cautions, "%s", kent_text_of(&t));
    h->cautions.failed = h->cautions.failed || t.failed;
    kent_text_clear(&t);
}

/* N: the greatest p A of one port over all cases, before any factor; its case. */
static double greatest_end_push(const kent_holding_work *w, const kent_load_case **of)
{
    const kent_fitting *f = w->fitting;
    double most = 0.0;

    for (size_t i = 0; i < w->loads->count; i++) {
        const kent_load_case *c = &w->loads->cases[i];
        const kent_instant *at[] = {&c->worst[KENT_RESULTANT], &c->highest};
        for (size_t k = 0; k < sizeof at / sizeof at[0]; k++) {
            if (!at[k]->set) continue;
            for (size_t n = 0; n < f->port_count; n++) {
                const double seal = w->m->ports[f->port_first + n].seal_diameter;
                const double push = at[k]->pressure * 0.25 * PI * seal * seal;
                if (!(push > most)) continue;
                most = push;
                *of = c;
            }
        }
    }
    return most;
}

/* A piece that is straight has no thrust of its own, but passes on what pulls at it, or
 * cannot. */
static void caution_straight(const kent_holding_work *w, kent_holding *h)
{
    const kent_role role = w->fitting->role;
    const kent_load_case *of = NULL;

    if (role != KENT_ROLE_WALL && role != KENT_ROLE_FLANGE_ADAPTOR) return;
    const double push = greatest_end_push(w, &of);
    if (!of) return;
    const kent_said size = kent_said_of(KENT_FORCE, w->m->units, push);
    if (role == KENT_ROLE_WALL) {
        kent_notes_add(&h->cautions,
                       "the structure must hold the main against %s along it from "
                       "either side, before any factor ('%s'), where the pipe beyond "
                       "is empty or its joints slip",
                       size.s, of->title.s);
        return;
    }
    kent_notes_warn(
        &h->cautions,
        "it takes no pull: %s opens it, before any factor ('%s'), unless tie "
        "bolts across it hold or both sides are held",
        size.s, of->title.s);
}

void kent_loads_caution(const kent_holding_work *w, kent_holding *h)
{
    caution_area(w, h);
    caution_straight(w, h);
    caution_end(w, h);
}
