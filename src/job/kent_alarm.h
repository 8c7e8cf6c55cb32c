/* Alarms: values that a case may hold and that are seldom meant. Slips of units, of
 * datum, of material. They refuse nothing; each is one sentence. */
#ifndef KENT_ALARM_H
#define KENT_ALARM_H

#include "kent_steady.h"

/* Where they are told. */
typedef enum kent_alarm_reader {
    KENT_ALARM_CHECK,
    KENT_ALARM_RUN /* less what the single fittings' cautions say anyway */
} kent_alarm_reader;

/* Adds a caution for every alarm that is raised. steadies: [count], elements may be
 * NULL; what needs a steady state is not looked at without one. */
void kent_alarms_raise(const kent_model *m, kent_steady *const *steadies, size_t count,
                       kent_alarm_reader reader, kent_notes *cautions);

#endif
