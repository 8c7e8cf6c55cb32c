/* What a scenario does to valves and outflows: a value (opening, or flow in m3/s) for
 * every instant. */
#ifndef KENT_SCHEDULE_INTERNAL_H
#define KENT_SCHEDULE_INTERNAL_H

#include "kent_model.h"

typedef struct kent_move { /* one event, in order of its start */
    const kent_event *event;
    const kent_law_point *law; /* [event->law_count] the model's */
    double from;               /* value at its start */
} kent_move;

typedef struct kent_course { /* of one valve or outflow */
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

/* The value at time (s), which an event changes from its start_time on. An event takes
 * over from whatever value the one before has reached. A law holds that value before
 * its first point and its last value for ever; ramps and laws are straight between. */
double kent_schedule_value(const kent_schedule *s, const kent_course *course,
                           double time);

#endif
