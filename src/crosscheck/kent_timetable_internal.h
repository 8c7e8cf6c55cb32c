/* What events make of one value (opening, flow, level, area): straight pieces in time.
 */
#ifndef KENT_TIMETABLE_INTERNAL_H
#define KENT_TIMETABLE_INTERNAL_H

#include "kent_model.h"

typedef struct kent_piece {
    double start;        /* s; it lasts to the next one's */
    double value, slope; /* at its start, per s */
} kent_piece;

/* kent_timetable t = {0}; is a valid, empty one. */
typedef struct kent_timetable {
    kent_piece *pieces; /* [count], first at t = 0 */
    size_t count, capacity;
    size_t now; /* the piece in force */
} kent_timetable;

/* What a scenario (-1: none) does to one target from value `from` on: an event takes
 * over from where the one before has got; a law holds that value before its first point
 * and its last one for ever, or begins again after its period. */
kent_status kent_timetable_fill(kent_timetable *t, const kent_model *m, int scenario,
                                kent_event_kind kind, int target, double from,
                                kent_error *err);
void kent_timetable_clear(kent_timetable *t);

/* A change of value in a straight line from a time on, held afterwards (s, s). */
kent_status kent_timetable_ramp(kent_timetable *t, double start, double ramp, double to,
                                kent_error *err);

/* Moves on to the piece that begins at time or holds it. */
void kent_timetable_move(kent_timetable *t, double time);
/* Start of the next piece, s; INFINITY: none. */
double kent_timetable_next(const kent_timetable *t);
/* By the piece in force: at its end the value it had until then. */
double kent_timetable_value(const kent_timetable *t, double time);

#endif
