/* What passes water between nodes, or out of the main: levels, outflows, valves, and
 * every device. One link has one flow q and up to three states of its own.
 *
 * Its equations are f = 0 for the flow and s' = rate for each state. They hold in the
 * mode it is in; where that ends, a root of `watch` stops the integration and `cross`
 * changes it. What events do to it is linear in time between two calls of `move`.
 *
 * A new device is one file and one row of what kent_passages_new makes. */
#ifndef KENT_PASSAGE_INTERNAL_H
#define KENT_PASSAGE_INTERNAL_H

#include "kent_steady.h"
#include "kent_timetable_internal.h"

enum {
    KENT_PASSAGE_STATES = 3,
    KENT_PASSAGE_ROOTS = 3,
    KENT_PASSAGE_UNKNOWNS = 3 + KENT_PASSAGE_STATES /* flow, two heads, states */
};

/* Places of a link's unknowns: flow m3/s from head[0] to head[1] or out of the main;
 * heads m at its nodes (0 where there is none). */
enum { KENT_AT_FLOW, KENT_AT_HEAD, KENT_AT_HEAD_BEYOND, KENT_AT_STATE };

typedef struct kent_law {
    double f;                         /* of the flow's equation, 0 where it holds */
    double by[KENT_PASSAGE_UNKNOWNS]; /* its derivatives */
    double rate[KENT_PASSAGE_STATES]; /* of the states, per s */
    double rate_by[KENT_PASSAGE_STATES][KENT_PASSAGE_UNKNOWNS];
} kent_law;

typedef struct kent_passage kent_passage;

typedef struct kent_passage_ops {
    size_t states, roots;
    void (*law)(const kent_passage *l, double time, const double *u, kent_law *law);
    /* NULL where it has no modes */
    void (*watch)(const kent_passage *l, double time, const double *u, double *root);
    /* which root was met, and whether it rose; may set states in u */
    void (*cross)(kent_passage *l, double time, double *u, size_t root, bool rising);
    /* what is due at a time of its own; may set states in u. NULL: its timetable only
     */
    void (*due)(kent_passage *l, double time, double *u);
    /* states that jumped with the heads of a change, into u. NULL: none do */
    void (*settle)(const kent_passage *l, double *u);
} kent_passage_ops;

typedef struct kent_level_passage {
    double loss; /* s2/m5: (1 + loss)/(2 g A2) of what flows out of it */
} kent_level_passage;

typedef struct kent_draw_passage {
    double level;       /* m, of the pipe there */
    double full;        /* m, head at which all is drawn; 0: whatever the pressure */
    double conductance; /* m2/s, of the pipes that end there */
} kent_draw_passage;

typedef struct kent_gate_passage {
    const kent_valve *valve;
    double capacity;    /* m^2.5/s at full opening */
    double level;       /* m, where it discharges */
    double conductance; /* m2/s, the least of both sides' pipes */
} kent_gate_passage;

/* The one-way valve of a pump or in line: its delay, and whether it is shut. */
typedef struct kent_gate_flap {
    kent_check_kind kind;
    double delay;    /* s from the first reversal to closure */
    double shuts_at; /* s; INFINITY: the flow has not reversed */
    double opened;   /* s, when it opened last */
    bool shut;
} kent_gate_flap;

typedef struct kent_unit_passage { /* units of a pump that fare alike */
    const kent_pump *pump;
    int units;
    const kent_event **event; /* [event_count] that concern it, by start; ours */
    size_t event_count, begun;
    double slope;    /* rad/s2, of a speed that is driven */
    double ramp_end; /* s; INFINITY: none goes on */
    double to;       /* rad/s, at its end */
    bool free;       /* power is lost: the speed follows from inertia and torque */
    bool standing;   /* behind its check valve, never yet started */
    kent_gate_flap flap;
} kent_unit_passage;

typedef struct kent_flap_passage { /* a check valve in line */
    double loss;                   /* s2/m5, when open */
    kent_gate_flap flap;
} kent_flap_passage;

typedef struct kent_control_passage {
    kent_holds holds;
    double set;                        /* m: head that it holds */
    double capacity;                   /* m^2.5/s when open */
    double opening_time, closure_time; /* s */
    double conductance;                /* m2/s */
} kent_control_passage;

typedef struct kent_relief_passage {
    double set, full, low;             /* m: heads; low -INFINITY: none */
    double level;                      /* m, where it discharges */
    double capacity;                   /* m^2.5/s when open */
    double opening_time, closure_time; /* s */
    double hold_time;                  /* s */
    double conductance;                /* m2/s */
    bool forced, armed; /* it opens for a fall it has seen; it may see one */
} kent_relief_passage;

typedef struct kent_store_passage { /* a surge tank, a one-way tank, an air vessel */
    double area;                    /* m2 of its surface; INFINITY: level stays */
    double overflow;                /* m; INFINITY: none */
    double loss_out_of_main, loss_into_main; /* s2/m5 */
    bool one_way;                            /* into the main only */
    double conductance;                      /* m2/s */
    kent_gas gas;              /* of a vessel, in the steady state; volume 0: none */
    double level;              /* m, of a vessel's water then */
    double barometric, weight; /* Pa absolute, N/m3 */
} kent_store_passage;

typedef struct kent_air_passage {
    kent_orifice orifice;
    double release, switched; /* m2 of what lets air out */
    double switch_pressure;   /* Pa gauge; INFINITY: never */
    double level, weight;     /* m, N/m3 */
    double heat;              /* J/kg: R T */
    bool open;                /* there is air under it */
} kent_air_passage;

typedef struct kent_hole_passage { /* a burst */
    const kent_event *event;       /* [event_count] the scenario's */
    size_t event_count;
    int index;
    double level;       /* m */
    double root_2g;     /* m^0.5/s */
    double conductance; /* m2/s */
} kent_hole_passage;

struct kent_passage {
    const kent_passage_ops *ops;
    const char *id;
    int node[2];       /* -1: outside */
    size_t at;         /* index of its flow in the unknowns; states follow */
    size_t root_first; /* its first root */
    void (*clear)(kent_passage *l); /* of what it owns; NULL: nothing */
    kent_timetable timetable;       /* of its opening, flow, level, area or speed */
    double alarm;                   /* s, of its own next change; INFINITY: none */
    bool settling; /* heads are sought that fit a change: no time passes */
    double start[1 + KENT_PASSAGE_STATES]; /* flow and states in the steady state */
    double scale[1 + KENT_PASSAGE_STATES]; /* what of each is as much as 1 m of head */
    union {
        kent_level_passage level;
        kent_draw_passage draw;
        kent_gate_passage gate;
        kent_unit_passage unit;
        kent_flap_passage flap;
        kent_control_passage control;
        kent_relief_passage relief;
        kent_store_passage store;
        kent_air_passage air;
        kent_hole_passage hole;
    } is;
};

typedef struct kent_passages {
    kent_passage *link; /* [count] */
    size_t count, capacity;
    size_t roots; /* of all */
} kent_passages;

/* Of a main in the state that s was found for. scenario -1: nothing happens. */
kent_status kent_passages_new(const kent_model *m, const kent_steady *s, int scenario,
                              kent_passages **out, kent_error *err);
void kent_passages_free(kent_passages *l);

/* Room for one more, all zero but for nodes, no alarm. NULL: no memory. */
kent_passage *kent_passages_add(kent_passages *l, const kent_passage_ops *ops,
                                const char *id, const int node[2]);

/* m2/s: sum of gA/a over the pipes that end at a node. */
double kent_node_conductance(const kent_model *m, int node);
/* The smaller one of two nodes; node -1 does not count. */
double kent_passage_conductance(const kent_model *m, const int node[2]);

/* Loss of a stream through k (s2/m5), m, and its derivative; steep enough at rest for
 * Newton's method to have an answer. */
double kent_passage_loss(double k, double flow, double *derivative);

/* q|q| with the same care, m6/s2. */
double kent_passage_square(double flow, double *derivative);

/* An opening of capacity e (m^2.5/s; nil: shut) between heads `drop` m apart, that
 * takes part of it from pipes of a conductance (m2/s): f = 0 of 17.12, written so that
 * Newton's method finds its flow both wide open and nearly shut. */
typedef struct kent_opening {
    double f, by_flow, by_drop, by_e;
} kent_opening;
kent_opening kent_passage_opening(double e, double conductance, double flow,
                                  double drop);

/* The same where nothing comes back: shut against a drop that is not above nil. */
kent_opening kent_passage_one_way(double e, double conductance, double flow,
                                  double drop);

/* ---- what stands at nodes: each adds one of its kind to links ---------------------
 */

typedef struct kent_stand {
    const kent_model *model;
    const kent_device *device;
    int scenario;   /* -1: none */
    double flow;    /* m3/s in the steady state, as kent_device says */
    double head[2]; /* m then, at its nodes; 0 where there is none */
} kent_stand;

typedef kent_status kent_stand_add(kent_passages *links, const kent_stand *stand,
                                   kent_error *err);
kent_stand_add kent_stand_pump, kent_stand_check_valve, kent_stand_control_valve,
    kent_stand_relief_valve, kent_stand_surge_tank, kent_stand_one_way_tank,
    kent_stand_air_vessel, kent_stand_air_valve, kent_stand_burst;

/* Shut where the steady flow (m3/s) is not forward; a delay of nil is none. */
kent_gate_flap kent_gate_flap_new(kent_check_kind kind, double delay, double flow);
/* What it watches: its flow, and the head (m) that would open it. root: [2] */
void kent_gate_flap_watch(const kent_gate_flap *f, double flow, double gap,
                          double *root);
/* What a root of it means. */
void kent_gate_flap_cross(kent_gate_flap *f, double time, size_t root, bool rising);

#endif
