/* What each device does in the steady state: which law its link obeys. (6.14) .. (6.17)
 *
 * A check valve, a control valve and a pump with a check valve let nothing back; a
 * control valve holds its set pressure where it can; a relief valve opens from its set
 * pressure on. All others let nothing pass. */
#ifndef KENT_DUTY_INTERNAL_H
#define KENT_DUTY_INTERNAL_H

#include "kent_equations_internal.h"

/* Fills the links of devices and of standing pump units: everything that may pass water
 * forward does, relief valves are shut. */
void kent_duty_start(kent_equations *eq);

/* Puts a device whose law a solution x contradicts under another one; whether it was.
 */
bool kent_duty_switch(kent_equations *eq, const double *x, size_t device);

/* Whether a device lets water forward only and is shut now; and opens it again. */
bool kent_duty_is_shut(const kent_equations *eq, size_t device);
void kent_duty_open(kent_equations *eq, size_t device);

/* KENT_E_INPUT, with the device's place, where a solution x does not suit one that
 * stands still: a tank would overflow, an air valve would take air. */
kent_status kent_duty_check(const kent_equations *eq, const double *x, kent_error *err);

/* m3/s through a device, all units of a pump together. */
double kent_duty_flow(const kent_equations *eq, const double *x, size_t device);

#endif
