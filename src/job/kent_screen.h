/* Figures for a hand check of what moved in a march (docs/theory 18). They are not its
 * answer. */
#ifndef KENT_SCREEN_H
#define KENT_SCREEN_H

#include "kent_job.h"

/* Where a path from what moved ends: the wave comes back from there. */
typedef enum kent_path_end {
    KENT_PATH_NONE, /* nothing there holds a level */
    KENT_PATH_LEVEL,
    KENT_PATH_TANK,    /* a surge tank or an air vessel */
    KENT_PATH_JUNCTION /* with pipes of three times the A/a of the one it comes by */
} kent_path_end;

typedef struct kent_screen {
    kent_event_kind kind; /* valve, outflow or pump */
    int target;           /* of the model's array of that kind */
    int point, span;      /* where it stands, the first pipe of its path */
    double velocity; /* m/s, change of velocity in that pipe; + where the pressure there
                      rises first */
    double wave_speed;   /* m/s, there */
    double per_velocity; /* Pa for 1 m/s */
    double sudden;       /* Pa */
    kent_path_end end;
    int end_point;
    double length;      /* m, of the path; NAN: KENT_PATH_NONE */
    double return_time; /* s; NAN */
    double time;        /* s, effective; NAN: not known */
    double slow;        /* Pa, by Michaud; NAN: not slow, or not known */
    double linear;      /* Pa, by the linear rule; NAN: not known */
    double rise, fall;  /* Pa, that the march found there, from the steady state */
} kent_screen;

/* The valves, pumps and outflows that move in one march, each once and in the order of
 * its events, into out; at most `most`. Returns how many there are. march: index into
 * results' scenarios. KENT_E_NOMEM is told as 0 and *failed. */
size_t kent_screen_of(const kent_results *r, size_t march, kent_screen *out,
                      size_t most, bool *failed);

#endif
