/* What a scenario does: a value for every instant of each valve (opening), outflow
 * (m3/s), fixed level (m) or burst (area, m2) that some event of it touches. A pump's
 * events have no one value, its units part; the pump follows them itself. */
#ifndef KENT_SCHEDULE_INTERNAL_H
#define KENT_SCHEDULE_INTERNAL_H

#include "kent_model.h"

typedef struct kent_move { /* one event, in order of its start */
    const kent_event *event;
    const kent_law_point *law; /* [event->law_count] the model's */
    double from;               /* value at its start */
} kent_move;

typedef struct kent_course { /* of one valve, outflow, level, pump or burst */
    kent_event_kind kind;
    int target;
    size_t first, count; /* into kent_schedule.moves */
} kent_course;

typedef struct kent_schedule {
    kent_course *courses;
    size_t course_count;
    kent_move *moves;
} kent_schedule;

/* scenario -1: nothing happens. */
kent_status kent_schedule_new(const kent_model *m, int scenario, kent_schedule **out,
                              kent_error *err);
void kent_schedule_free(kent_schedule *s);

/* NULL: no event touches it. */
const kent_course *kent_schedule_course(const kent_schedule *s, kent_event_kind kind,
                                        int target);

/* The event that rules at time (s): the last that has started, or the first. */
const kent_move *kent_schedule_move(const kent_schedule *s, const kent_course *course,
                                    double time);

/* The value at time (s), which an event changes from its start_time on. An event takes
 * over from whatever value the one before has reached. A law holds that value before
 * its first point and its last value for ever, or begins again after its period; ramps
 * and laws are straight between. */
double kent_schedule_value(const kent_schedule *s, const kent_course *course,
                           double time);

#endif
