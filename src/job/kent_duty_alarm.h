/* Alarms: what devices do in the steady state that is seldom meant. */
#ifndef KENT_DUTY_ALARM_H
#define KENT_DUTY_ALARM_H

#include "kent_steady.h"

/* Adds a caution for a pump that runs without delivering, or beyond its curve; for
 * water through pumps that stand, or kept from it; for a relief valve that flows, and
 * for a scenario that leaves it out. steadies: [count], elements may be NULL. */
void kent_duty_alarms_raise(const kent_model *m, kent_steady *const *steadies,
                            size_t count, kent_notes *cautions);

#endif
