/* A worked-out leg as a restrained length: whole pipes, where it ends, and what is said
 * of it. */
#include "kent_holding_internal.h"
#include "kent_said.h"

/* Relative: lengths by two forms that differ by less are one. */
static const double SAME_LENGTH = 1e-9;

/* ---- what is said ---------------------------------------------------------------- */

/* What a leg passes through without being held. */
static void note_free(kent_holding_work *w, const kent_leg_piece *at)
{
    const kent_said far = kent_said_of(KENT_LENGTH, w->m->units, at->length);

    switch (at->free) {
    case KENT_FREE_NOT: /* a pipe that floats, or that steep ground draws along */
    case KENT_FREE_SOIL:
        kent_notes_add(&w->met,
                       "the restrained length passes through %s of %s, which holds "
                       "nothing",
                       far.s, at->soil->id);
        return;
    case KENT_FREE_FILL:
        kent_notes_add(&w->met,
                       "the restrained length passes through %s of backfill '%s', "
                       "through which nothing holds it",
                       far.s, at->fill->id);
        return;
    case KENT_FREE_CASING:
        kent_notes_add(&w->met,
                       "the restrained length passes through %s of casing, which holds "
                       "nothing: restrain every joint in it",
                       far.s);
        return;
    case KENT_FREE_ABOVE:
        kent_notes_add(&w->met,
                       "the restrained length passes along %s of %s, which lies above "
                       "ground and is held by nothing there",
                       far.s, at->pipe->id);
        return;
    }
}

/* Which soil gives what, where the trench is filled with another. */
static void note_backfill(kent_holding_work *w, const kent_leg_work *work,
                          const kent_leg_piece *at)
{
    if (at->fill == at->soil) return;
    if (work->bears) {
        kent_notes_add(&w->met,
                       "friction on the pipe is that of the backfill, '%s'; the side "
                       "of the trench bears as the native soil, '%s'",
                       at->fill->id, at->soil->id);
        return;
    }
    kent_notes_add(&w->met,
                   "friction on the pipe is that of the backfill, '%s', not of the "
                   "native soil, '%s'",
                   at->fill->id, at->soil->id);
}

/* What trench is guessed at, and whose weak ground it goes by. */
static void note_piece(kent_holding_work *w, const kent_leg_work *work,
                       const kent_leg_piece *at)
{
    const int kind = at->trench_kind;

    if (!at->counts) {
        note_free(w, at);
        return;
    }
    note_backfill(w, work, at);
    if (work->bears && kind >= 0 && isnan(at->soil->passive_by_trench[kind])) {
        kent_notes_add(&w->met,
                       "soil '%s' has no share of passive pressure for a trench of "
                       "%s: its passive_ratio, %g, is taken",
                       at->soil->id, kent_trench_word(kind), at->side.passive_ratio);
    }
    if (at->weakest < 0) return;
    kent_notes_add(&w->met,
                   "the ground at %s is the weakest along the restrained "
                   "length, which is worked out with it; ground_zones would "
                   "bound it",
                   w->m->points[at->weakest].id);
}

/* What a tee's restrained run does for its branch. */
static void note_run(kent_holding_work *w, const kent_leg_work *work)
{
    const kent_system units = w->m->units;
    const double *stated = w->fitting->stated.run_length;
    const double run = work->run[0] + work->run[1];
    const double asked = fmax(0.0, stated[0]) + fmax(0.0, stated[1]); /* NAN: 0 */

    if (!(asked > 0.0) || w->fitting->type != KENT_TEE) return;
    if (work->run_unknown) {
        kent_notes_add(&w->met, "the ground along the tee's run lacks values: nothing "
                                "of it is credited");
    } else if (!(w->m->rules.run_share > 0.0)) {
        kent_notes_add(&w->met, "these design rules count nothing of the bearing of a "
                                "tee's run (run_share)");
    } else if (!(work->credit > 0.0)) {
        kent_notes_add(&w->met, "the tee pushes up, its legs can be shut, or its run "
                                "can't lean on the ground: nothing of the run is "
                                "credited");
    } else {
        kent_notes_add(
            &w->met,
            "the tee's run, every joint of it restrained over %s, takes %s of the "
            "factored thrust",
            kent_said_of(KENT_LENGTH, units, run).s,
            kent_said_of(KENT_FORCE, units,
                         fmin(work->credit, work->factor * work->force))
                .s);
    }
    if (run < asked - KENT_SAME_PLACE && work->credit > 0.0) {
        kent_notes_add(&w->met,
                       "of the %s of run said to be restrained only so much counts: "
                       "something on the way breaks the rest",
                       kent_said_of(KENT_LENGTH, units, asked).s);
    }
}

/* The other published form, where it asks for more; and a form that has none. */
static void note_forms(kent_holding_work *w, const kent_port *p,
                       const kent_leg_work *work)
{
    const kent_length_form other =
        work->form == KENT_FORM_ETL ? KENT_FORM_HANDBOOK : KENT_FORM_ETL;
    const char *name =
        other == KENT_FORM_ETL ? "USACE ETL 1110-3-446" : "iron-pipe handbooks";

    if (work->by_form[other] > work->length * (1.0 + SAME_LENGTH)) {
        kent_notes_add(&w->met,
                       "by the form of %s the restrained length towards %s would be %s",
                       name, p->toward >= 0 ? w->m->points[p->toward].id : "its end",
                       kent_said_of(KENT_LENGTH, w->m->units, work->by_form[other]).s);
    }
    if (w->m->rules.length_form == KENT_FORM_ETL &&
        isnan(work->by_form[KENT_FORM_ETL])) {
        kent_notes_add(&w->met, "USACE ETL 1110-3-446 has no form for this: the "
                                "restrained length is by that of iron-pipe handbooks");
    }
}

/* A reducer in line draws one of its pipes and presses the other. */
static void note_reducer(kent_holding_work *w, const kent_port *p)
{
    if (w->fitting->type != KENT_REDUCER ||
        !kent_leg_rule_of(w->m, w->fitting)->either) {
        return;
    }
    const double along = kent_vec3_dot(w->pull, p->direction);
    if (p->toward < 0) return;
    kent_notes_add(&w->met,
                   along < 0.0
                       ? "the pipe towards %s is drawn: restrained joints there hold "
                         "the reducer"
                       : "the pipe towards %s is pressed: there the length is of "
                         "straight pipe whose joints are pushed home, without a gap",
                   w->m->points[p->toward].id);
}

/* ---- where it ends --------------------------------------------------------------- */

static void note_break(kent_holding_work *w, const kent_leg_walk *walk)
{
    const kent_fitting *f = &w->m->fittings[walk->fitting];

    if (f->role == KENT_ROLE_FLANGE_ADAPTOR) {
        kent_notes_add(&w->met,
                       "the restrained length reaches the flange adaptor at %s, which "
                       "slips: tie it across with rods, or leave it out",
                       f->id);
        return;
    }
    kent_notes_add(&w->met,
                   "the restrained length reaches %s: restrain every joint up "
                   "to it and treat both as one system",
                   f->id);
}

/* Bends and tees on the way that no restrained joints hold: those that such joints hold
 * are told of with the system that both belong to. */
static void note_passed(kent_holding_work *w, const kent_leg_walk *walk)
{
    for (size_t i = 0; i < walk->passed_count; i++) {
        const kent_fitting *f = &w->m->fittings[walk->passed[i]];
        if (f->restraint == KENT_RESTRAINED_JOINTS ||
            f->restraint == KENT_BLOCK_AND_JOINTS) {
            continue;
        }
        kent_notes_add(&w->met,
                       "the restrained length runs through %s: restrain its joints "
                       "too",
                       f->id);
    }
}

static void note_end(kent_holding_work *w, const kent_leg_walk *walk, double length,
                     double pull)
{
    const kent_model *m = w->m;

    switch (walk->end) {
    case KENT_LEG_IN_GROUND:
    case KENT_LEG_AT_DEAD_END: /* the two are one system, which tells of it */
        return;
    case KENT_LEG_AT_STRUCTURE:
        kent_notes_add(&w->met,
                       "the restrained length ends after %s at the structure at %s, "
                       "which must be made for a pull of %s factored",
                       kent_said_of(KENT_LENGTH, m->units, walk->reach).s,
                       m->fittings[walk->fitting].id,
                       kent_said_of(KENT_FORCE, m->units, pull).s);
        return;
    case KENT_LEG_AT_FITTING:
        note_break(w, walk);
        return;
    case KENT_LEG_AT_SOFT:
        kent_notes_add(&w->met,
                       "the restrained length runs into ground at %s that gives no "
                       "restraint: carry it through by as much again as lies there",
                       m->points[walk->point].id);
        return;
    case KENT_LEG_AT_PIPE_END:
        kent_notes_add(
            &w->met,
            "the restrained length of %s is longer than the %s of pipe up to %s: "
            "restrain every joint and anchor the rest there",
            kent_said_of(KENT_LENGTH, m->units, length).s,
            kent_said_of(KENT_LENGTH, m->units, walk->reach).s,
            m->points[walk->point].id);
        return;
    }
}

kent_leg_walk kent_leg_lay(const kent_model *m, const kent_standings *standings,
                           size_t fitting, size_t port, const kent_leg_work *work,
                           kent_leg *leg)
{
    const kent_port *p = &m->ports[m->fittings[fitting].port_first + port];
    const double pull = work->factor * work->force;
    double length = 0.0;
    kent_leg_walk walk =
        kent_leg_walk_of(m, standings, fitting, p, work->length, work->own);
    const int pipes = kent_leg_whole(m, &walk, &length);

    if (walk.end == KENT_LEG_IN_GROUND && pipes > 0) {
        walk = kent_leg_walk_of(m, standings, fitting, p, length, work->own);
    }
    *leg = (kent_leg){
        .port = port,
        .length = work->length,
        .pipes = pipes,
        .fits = kent_leg_end_fits(walk.end),
        .by_form = {work->by_form[0], work->by_form[1]},
        .form = work->form,
        .pull = work->force,
        .factor = work->factor,
        .demand = work->demand,
        .bears = work->bears,
        .credit = work->credit,
        .end = walk.end,
        .end_point = walk.point,
        .reach = walk.reach,
        .structure_pull = walk.end == KENT_LEG_AT_STRUCTURE ? pull : 0.0,
    };
    return walk;
}

kent_leg kent_leg_of(kent_holding_work *w, size_t port, const kent_leg_work *work)
{
    const kent_port *p = &w->m->ports[w->fitting->port_first + port];
    kent_leg leg;
    const kent_leg_walk walk =
        kent_leg_lay(w->m, w->standings, w->index, port, work, &leg);

    for (size_t i = 0; i < work->piece_count; i++) {
        note_piece(w, work, &work->piece[i]);
    }
    note_run(w, work);
    note_forms(w, p, work);
    note_reducer(w, p);
    note_passed(w, &walk);
    note_end(w, &walk, work->length, leg.factor * leg.pull);
    return leg;
}
