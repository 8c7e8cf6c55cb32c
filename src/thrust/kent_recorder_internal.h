/* What the recorder keeps. Only thrust/ looks inside. */
#ifndef KENT_RECORDER_INTERNAL_H
#define KENT_RECORDER_INTERNAL_H

#include "kent_along_internal.h"

/* Heads and flows at a fitting's ports at one instant. */
typedef struct kent_frame {
    double time;                  /* s; NAN */
    double head[KENT_PORTS];      /* m, piezometric */
    double flow[KENT_PORTS];      /* m3/s out of the fitting */
    double flow_rate[KENT_PORTS]; /* m3/s2 */
} kent_frame;

/* Thrust without its unsteady part is  constant + sum (per_head H + per_square Q^2)
 * over the watches of a fitting: one term each. */
typedef struct kent_term {
    size_t watch;
    kent_vec3 per_head;   /* N/m */
    kent_vec3 per_square; /* N s2/m6 */
} kent_term;

typedef struct kent_sensor { /* of one fitting in one state: beta is that state's */
    size_t term_first, term_count;
    size_t watch[KENT_PORTS];  /* by port; of one without a pipe the reference port's */
    bool faces;                /* each port's highest head is wanted */
    bool outlet;               /* it has an open end: */
    double brings[KENT_PORTS]; /* by port: +1, -1 of those with pipes, else 0 */
    kent_vec3 per_outlet_square; /* N s2/m6, on the square of what they bring (8.13) */
    kent_vec3 constant;          /* N */
    double crossing;             /* s, a wave across the fitting and back; 0: no face */
} kent_sensor;

/* Instants counted by their level: the leading bits of the squared resultant, 1024 to a
 * doubling. A doubling's upper part above 0.9^2 spans fewer than 400 of them. */
enum { KENT_LEVELS = 512 };

typedef struct kent_seen {    /* of one fitting in one march */
    double best[KENT_SENSES]; /* N2, N2, N, N; -1: none yet, up and down 0 */
    kent_frame frame[KENT_SENSES];
    double lowest, highest; /* m, head of the widest port */
    kent_frame frame_lowest, frame_highest;
    double highest_head[KENT_PORTS], highest_at[KENT_PORTS]; /* m, s; of faces */
    unsigned long long top;                                  /* highest level met */
    unsigned
        at_level[KENT_LEVELS]; /* instants by level, the lowest bits of which index */
} kent_seen;

typedef struct kent_slot { /* of one march */
    bool started, failed;
    double step;     /* s */
    kent_seen *seen; /* [fitting_count] */
    double *past;    /* [past_rows][watch_count] m3/s, the instants before the next */
    size_t past_rows;
    bool past_filled;
} kent_slot;

struct kent_recorder {
    const kent_model *model;
    kent_steady *const *steadies; /* [state_count] */
    kent_watch *watches;
    size_t watch_count, watch_capacity;
    kent_term *terms;
    size_t term_count, term_capacity;
    kent_sensor *sensors; /* [state_count][fitting_count]; watches are the same */
    kent_slot *slots;     /* [march_count] */
    kent_along *along;    /* runs and strings */
};

/* Level of a squared resultant. */
unsigned long long kent_level_of(double square);

/* s that the resultant was above 0.9 of its peak. */
double kent_seen_above_90_percent(const kent_seen *seen, double step);

/* Whether a march was run, and may decide a load case. */
bool kent_recorder_counts(const kent_recorder *r, size_t march);

/* Whether the fitting stands in the network, not on given ports. */
bool kent_fitting_in_network(const kent_fitting *f);

/* Heads and flows of the ports without pipes, from those with: a dead branch has the
 * reference port's head and no flow, an open end passes on what the others bring. */
void kent_frame_complete(const kent_model *m, const kent_fitting *f, kent_frame *frame);

/* The balance of an instant in the network: pressures from heads by 8.3 and 9.3. Each
 * side of a valve keeps the pressure of its own head. */
kent_instant kent_instant_of_frame(const kent_model *m, const kent_fitting *f,
                                   const kent_frame *frame);

/* The balance at rest under one pressure (Pa, at the centre) at every port but an open
 * end, or at port `only` alone. */
kent_instant kent_instant_at_rest(const kent_model *m, const kent_fitting *f,
                                  double pressure, int only);

/* The balance at rest under one pressure at every port but an open end and the dry one.
 */
kent_instant kent_instant_emptied(const kent_model *m, const kent_fitting *f,
                                  double pressure, size_t dry);

/* By port, whether something behind it could press on it with the fitting itself shut
 * off: a fixed level, a pump, a tank or vessel. Returns -1 without memory. */
int kent_ports_supplied(const kent_model *m, const kent_fitting *f,
                        bool supplied[KENT_PORTS]);

/* The balance at rest of a branch extended: every end closed, under one pressure. */
kent_instant kent_instant_extended(const kent_model *m, const kent_fitting *f,
                                   const kent_load_case *c, double pressure);

/* The balance of the pressures and flows that the ports state themselves. */
kent_instant kent_instant_given(const kent_model *m, const kent_fitting *f);

/* Whether the thrust without its unsteady part points the way of a sense at all. */
bool kent_instant_has_sense(const kent_instant *i, kent_sense sense);

#endif
