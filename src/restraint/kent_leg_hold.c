/* A worked-out leg as a restrained length: whole pipes, and what is said of it. */
#include "kent_holding_internal.h"
#include "kent_said.h"
#include "kent_side_internal.h"

#include <limits.h>

/* Says what a leg passes through without being held, what trench is guessed at, and
 * whose weak ground it goes by. */
static void leg_note(kent_holding_work *w, const kent_leg_work *work)
{
    const kent_system units = w->m->units;

    for (size_t i = 0; i < work->piece_count; i++) {
        const kent_leg_piece *at = &work->piece[i];
        if (!at->counts) {
            kent_notes_add(&w->met,
                           "the restrained length passes through %s of %s, which holds "
                           "nothing",
                           kent_said_of(KENT_LENGTH, units, at->length).s,
                           at->soil->id);
        } else if (work->bears && at->trench_kind >= 0 &&
                   isnan(at->soil->passive_by_trench[at->trench_kind])) {
            kent_notes_add(&w->met,
                           "soil '%s' has no share of passive pressure for a trench of "
                           "%s: its passive_ratio, %g, is taken",
                           at->soil->id, kent_trench_word(at->trench_kind),
                           at->trench.passive_ratio);
        }
        if (at->counts && at->weakest >= 0) {
            kent_notes_add(&w->met,
                           "the ground at %s is the weakest along the restrained "
                           "length, which is worked out with it; ground_zones would "
                           "bound it",
                           w->m->points[at->weakest].id);
        }
    }
}

kent_leg kent_leg_of(kent_holding_work *w, size_t port, const kent_leg_work *work)
{
    const double laying = work->pipe->laying_length;
    double length = work->length;
    int pipes = 0;

    if (laying > 0.0) {
        const double whole = ceil(length / laying - KENT_SIDE_SLACK);
        pipes = whole < INT_MAX ? (int)whole : INT_MAX;
        length = (double)pipes * laying;
    }
    leg_note(w, work);
    return (kent_leg){
        .port = port,
        .length = work->length,
        .pipes = pipes,
        .by_form = {work->length, NAN},
        .pull = work->force,
        .end_point = -1,
        .reach = length,
        .fits = kent_leg_fits(w->m, w->standings, w->index, port, length, work->own,
                              &w->met),
    };
}
