/* Load cases: what each fitting must be held against, and at which instant.
 *
 * The recorder is pulled through the march: kent_loads_watches says what to watch,
 * kent_loads_take reads every instant of a trace. Forces come from one instant's
 * pressures and flows; maxima taken apart do not make a force. */
#ifndef KENT_LOADS_H
#define KENT_LOADS_H

#include "kent_balance.h"
#include "kent_derivation.h"
#include "kent_marcher.h"
#include "kent_run.h"
#include "kent_site_test.h"
#include "kent_string.h"

/* The four ways a thrust can be worst. */
typedef enum kent_sense {
    KENT_RESULTANT,
    KENT_SIDEWAYS,
    KENT_UPWARD,
    KENT_DOWNWARD,
    KENT_SENSES
} kent_sense;

typedef struct kent_instant {
    bool set;        /* false: this sense never occurs (never pushes up) */
    double time;     /* s; NAN outside scenarios */
    double pressure; /* Pa gauge, at the fitting's centre */
    kent_balance balance;
} kent_instant;

typedef struct kent_load_case {
    /* "test", "static", "shut-off", "steady", "future", a scenario's id, "suction",
     * "closed from P", "closed to P", "branch extended", "given" */
    char name[KENT_ID + 16];
    kent_name title;     /* as printed: its name and, among several, its state's */
    kent_case_kind kind; /* whose safety factor it takes */
    int scenario;        /* -1: none; of a closed valve: whose peak presses on it */
    int state;           /* the steady one or the march's; -1: of none in particular */
    bool given;          /* the one case of a ports-only fitting */
    bool extended;       /* a branch without a pipe, once one is joined to it */
    bool later;          /* under the pressure expected later */
    bool closed;         /* of a shut valve or leg, pressed from one side only */
    bool emptied;        /* of a shut leg, with nothing behind it, the others pressed */
    size_t pressed;      /* where closed: which port */
    size_t dry;          /* where emptied: which port */
    const kent_site_test *test; /* of the result: how the test pressure was found; NULL:
                                   as stated */
    double safety_factor;
    double increase; /* >= 1, on what soil may bear in cases of this kind, as stated */
    kent_instant worst[KENT_SENSES];
    kent_instant lowest, highest; /* of a scenario: by the head; what pulls is not
                                     always the worst, but may pull the other way */
    double above_90_percent; /* s that the resultant stays above 0.9 of its peak; NAN
                                outside scenarios */
    double step;             /* s, of the scenario's grid; NAN outside scenarios */
} kent_load_case;

typedef struct kent_fitting_loads {
    kent_load_case *cases; /* [count], in the order of listing */
    size_t count;
} kent_fitting_loads;

typedef struct kent_loads_result {
    kent_fitting_loads *fittings; /* [fitting_count] */
    size_t fitting_count;
    kent_site_test test;
    kent_run *runs; /* [run_count] above ground */
    size_t run_count;
    kent_strings strings; /* of fused and welded pipe */
} kent_loads_result;

typedef struct kent_recorder kent_recorder;

/* For one model and its steady states [state_count], which must outlive it; pass every
 * march through it, in any order. Per fitting and march it keeps about 3 kB, however
 * many steps. */
kent_status kent_recorder_new(const kent_model *m, kent_steady *const *steadies,
                              kent_recorder **out, kent_error *err);
void kent_recorder_free(kent_recorder *r);

/* The places this recorder reads: lives as long as it. A trace given to
 * kent_recorder_take must have these first, in this order (more may follow). */
const kent_watch *kent_recorder_watches(const kent_recorder *r, size_t *count);

/* One march's slot, by its index in the model's marches, may be filled from any thread,
 * but only from one at a time. kent_recorder_start clears the slot: call it before the
 * first take, and again where a finer grid replaces a coarser one. step: s, of the
 * grid. */
void kent_recorder_start(kent_recorder *r, int march, double step);
void kent_recorder_take(kent_recorder *r, int march, const kent_trace *trace);

/* All load cases of all fittings; *out is the caller's. A march that was never started
 * has no case. surge: the highest pressure of all marches anywhere on the main, point
 * -1: none was run. */
kent_status kent_recorder_finish(const kent_recorder *r, const kent_worst *surge,
                                 kent_loads_result **out, kent_error *err);
void kent_loads_free(kent_loads_result *l);

/* N: the thrust without the force of the changing flow (8.7), which never governs. */
kent_vec3 kent_instant_lasting(const kent_instant *i);

/* Whether a leg of a branching fitting can be shut, so that it is under pressure alone,
 * or empty beside the others: as the case states, else every pipe at a cross or wye.
 * Never of a valve, for which kent_fitting_shuts tells. source docs/theory 9.16 */
bool kent_port_shuts(const kent_model *m, const kent_fitting *f, size_t port);
bool kent_fitting_has_shut_legs(const kent_model *m, const kent_fitting *f);

/* The ports that a case's balance is made of, in its order: the fitting's own and,
 * where a branch is extended, that branch behind them. Returns how many. */
size_t kent_load_case_ports(const kent_model *m, const kent_fitting *f,
                            const kent_load_case *c, kent_port out[KENT_PORTS]);

/* N m, about the fitting's centre: what the pushes of a group leave although their sum
 * may be nil (docs/theory 8.15). NAN where no coordinates are given. */
kent_vec3 kent_instant_couple(const kent_model *m, const kent_fitting *f,
                              const kent_instant *i);

/* The horizontal size of a thrust, and its azimuth (rad, clockwise from north, 0 .. 2
 * pi). */
double kent_thrust_horizontal(kent_vec3 thrust);
double kent_thrust_azimuth(kent_vec3 thrust);

/* Writes one case's balance as the table of signs and a hand calculation into d: ports,
 * sum, and the check line for the fitting's type (2 p A sin(angle/2) for a bend ...).
 */

void kent_loads_derive(const kent_model *m, const kent_fitting *fitting,
                       const kent_load_case *load, kent_sense sense,
                       kent_derivation *d);

/* The lines p_later and z_later: the pressure expected later, and where it is read. */
void kent_loads_derive_later(const kent_model *m, const kent_fitting *f,
                             kent_derivation *d);

#endif
