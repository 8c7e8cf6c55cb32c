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
} kent_passage_ops;

typedef struct kent_level_link {
    double loss; /* s2/m5: (1 + loss)/(2 g A2) of what flows out of it */
} kent_level_link;

typedef struct kent_draw_link {
    double level;       /* m, of the pipe there */
    double full;        /* m, head at which all is drawn; 0: whatever the pressure */
    double conductance; /* m2/s, of the pipes that end there */
} kent_draw_link;

typedef struct kent_gate_link {
    const kent_valve *valve;
    double capacity;    /* m^2.5/s at full opening */
    double level;       /* m, where it discharges */
    double conductance; /* m2/s, the least of both sides' pipes */
} kent_gate_link;

struct kent_passage {
    const kent_passage_ops *ops;
    const char *id;
    int node[2];              /* -1: outside */
    size_t at;                /* index of its flow in the unknowns; states follow */
    size_t root_first;        /* its first root */
    kent_timetable timetable; /* of its opening, flow, level, area or speed */
    double alarm;             /* s, of its own next change; INFINITY: none */
    double start[1 + KENT_PASSAGE_STATES]; /* flow and states in the steady state */
    double scale[1 + KENT_PASSAGE_STATES]; /* what of each is as much as 1 m of head */
    int mode;
    union {
        kent_level_link level;
        kent_draw_link draw;
        kent_gate_link gate;
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
    double f, by_flow, by_drop;
} kent_opening;
kent_opening kent_passage_opening(double e, double conductance, double flow,
                                  double drop);

#endif
