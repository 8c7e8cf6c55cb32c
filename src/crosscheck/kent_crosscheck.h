/* A second opinion on marches: the same scenarios by the second method, on two meshes,
 * and as a rigid column where they are slow. What it leaves out is said in words. */
#ifndef KENT_CROSSCHECK_H
#define KENT_CROSSCHECK_H

#include "kent_second.h"

/* Of (highest - lowest): what the two methods may differ by where events are slow. */
extern const double KENT_CROSSCHECK_ASKED;

typedef struct kent_opinion { /* on one march */
    kent_second_peak *peaks;  /* [point_count] on the finer mesh */
    kent_second_peak *coarse; /* on cells twice as long: the whole difference is the
                                 method's own error */
    kent_second_peak
        *rigid; /* of a rigid column; NULL: too fast, or a device switches */
    kent_second_report report, rigid_report;
    double cell;           /* m, of the finer mesh, at most */
    double ramp;           /* s, of the quickest event; INFINITY: none; 0: sudden */
    double back_and_forth; /* s: 2L/a, twice the way from an event to where it is
                              longest */
    kent_notes left_out;   /* sentences */
    kent_error stopped;    /* what: why it has no peaks; "": it went to the end */
} kent_opinion;

/* Whether the quickest event takes at least 2L/a. Then agreement is asked for, but
 * where water parts in one method and not in the other. */
bool kent_opinion_is_asked(const kent_opinion *o);

/* marches: [count] of m, steadies: [state_count] of its states. threads as of
 * kent_queue_run. out: [count], all zero, filled as far as it went; each is cleared by
 * the caller. Where the second method stops on the way, that opinion says so and
 * the others go on. Fails with KENT_E_NOMEM. */
kent_status kent_crosscheck_run(const kent_model *m, kent_steady *const *steadies,
                                const kent_march *marches, size_t count,
                                unsigned threads, kent_opinion *out, kent_error *err);
void kent_opinion_clear(kent_opinion *o);

#endif
