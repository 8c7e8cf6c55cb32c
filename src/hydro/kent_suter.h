/* Complete characteristics of pumps in Suter's form, as published: 13.3. */
#ifndef KENT_SUTER_H
#define KENT_SUTER_H

#include "kent_pump.h"

enum { KENT_SUTER_CURVES = 3 };

/* Of one specific speed. Point i is at x = i pi/44, x = pi + atan2(v, alpha), where v
 * and alpha are flow and speed over their rated values. */
typedef struct kent_suter {
    double specific_speed;        /* rpm, m3/s, m */
    double wh[KENT_SUTER_POINTS]; /* head over its rated value, over alpha2 + v2 */
    double wb[KENT_SUTER_POINTS]; /* torque, likewise */
} kent_suter;

/* Where the numbers come from, and that they are from memory. */
extern const char KENT_SUTER_SOURCE[];

extern const kent_suter KENT_SUTER[KENT_SUTER_CURVES]; /* specific speed rising */

#endif
