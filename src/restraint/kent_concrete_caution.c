/* What the concrete of a block, or of all blocks, asks of whoever builds it. */
#include "kent_concrete_internal.h"
#include "kent_said.h"

static const double DAY = 86400.0; /* s */

static void caution_pressed(const kent_holding_work *w, kent_holding *h)
{
    const kent_concrete_check *c = &h->concrete;
    const kent_system units = w->m->units;

    if (!c->pressed) {
        const bool through = w->site.hole > 0.0;
        const bool collar = through && w->demand.load[KENT_SIDEWAYS] > 0.0;
        if (collar || !(c->load > 0.0)) return; /* said with what it hands over */
        kent_notes_add(&h->cautions,
                       "%s a flange or ring on it must press on %s of its concrete, or "
                       "more; state it as contact_area",
                       through ? "the pipe passes through the block:"
                               : "what a valve presses on its block with is not known:",
                       kent_said_of(KENT_AREA, units, c->contact_needed).s);
        return;
    }
    if (c->use > 1.0 + 1e-9) { /* on a contact that nobody states */
        kent_notes_warn(
            &h->cautions,
            "the fitting surely presses on %s of the block alone, and there with %s, "
            "where concrete of %s takes %s: state what it presses on as contact_area "
            "(%s would do), or take stronger concrete",
            kent_said_of(KENT_AREA, units, c->contact.width * c->contact.height).s,
            kent_said_of(KENT_STRENGTH, units, c->pressure).s,
            kent_said_of(KENT_STRENGTH, units, c->strength).s,
            kent_said_of(KENT_STRENGTH, units, c->allowed).s,
            kent_said_of(KENT_AREA, units, c->contact_needed).s);
        return;
    }
    if (!c->splits) return;
    kent_notes_warn(
        &h->cautions,
        "the fitting presses on the block with %s, which its concrete takes "
        "only as the thrust widens inside it: reinforce it there against "
        "splitting",
        kent_said_of(KENT_STRENGTH, units, c->pressure).s);
}

void kent_concrete_caution(const kent_holding_work *w, kent_holding *h)
{
    const kent_concrete_check *c = &h->concrete;

    if (!c->made) return;
    caution_pressed(w, h);
    if (!isnan(c->age)) return;
    kent_notes_warn(
        &h->cautions,
        "concrete of %s never has the %s that it needs before a test: take a "
        "stronger one",
        kent_said_of(KENT_STRENGTH, w->m->units, c->strength).s,
        kent_said_of(KENT_STRENGTH, w->m->units, c->strength_needed).s);
}

/* ---- all blocks ------------------------------------------------------------------ */

/* The fitting whose concrete must be oldest; -1: no block. */
static int oldest(const kent_restraints *r)
{
    int found = -1;

    for (size_t i = 0; i < r->fitting_count; i++) {
        const kent_concrete_check *c = &r->fittings[i].concrete;
        if (!c->made) continue;
        if (found < 0 || isnan(c->age) || c->age > r->fittings[found].concrete.age) {
            found = (int)i;
        }
        if (isnan(c->age)) return found;
    }
    return found;
}

static void caution_age(const kent_model *m, kent_restraints *r, int slowest)
{
    const kent_concrete_check *c = &r->fittings[slowest].concrete;

    r->age = c->age;
    if (isnan(c->age)) return; /* its fitting's own caution */
    kent_text t = {0};
    kent_text_add(
        &t,
        "no test before the concrete of the blocks is %.0f days old, unless the "
        "fittings are held by other means meanwhile: ",
        c->age / DAY);
    if (c->age_asked) {
        kent_text_add(&t, "the design rules ask for that");
    } else {
        kent_text_add(
            &t,
            "at %s it wants %s by then, of %s%s at 28 days; a stronger class, "
            "or cement that gains strength rapidly, makes that sooner",
            m->fittings[slowest].id,
            kent_said_of(KENT_STRENGTH, m->units, c->strength_needed).s,
            kent_said_of(KENT_STRENGTH, m->units, c->strength).s,
            c->strength_assumed ? " assumed" : "");
    }
    kent_notes_add(&r->cautions, "%s", kent_text_of(&t));
    r->cautions.failed = r->cautions.failed || t.failed;
    kent_text_clear(&t);
}

bool kent_concrete_conclude(const kent_model *m, kent_restraints *r)
{
    const int slowest = oldest(r);

    for (size_t i = 0; i < r->fitting_count; i++) {
        r->quantities = kent_quantity_sum(r->quantities, r->fittings[i].quantities);
    }
    if (slowest < 0) return true;
    caution_age(m, r, slowest);
    return !r->cautions.failed;
}
