/* The march: the whole network by the method of characteristics, pulled step by step.
 *
 * kent_marcher_advance returns a const view of the next instants at the watched places;
 * it knows no reader. All memory is taken by kent_marcher_new; advancing allocates
 * nothing, prints nothing and cannot run out of memory. How nodes lie in memory is
 * known to surge/ alone. Bits do not depend on the instruction set chosen at start. */
#ifndef KENT_MARCHER_H
#define KENT_MARCHER_H

#include "kent_grid.h"
#include "kent_steady.h"

/* A place whose head and flow are wanted at every instant: m from the span's start.
 * Between grid points both are interpolated linearly at the same instant. A cavity
 * parts the flows before and after its grid point: a watch there reads their mean, one
 * just beside it the flow on its side. */
typedef struct kent_watch {
    int span;
    double chainage;
} kent_watch;

/* What a device shows at every instant besides its flow. */
enum { KENT_TOLD = 3 };
typedef struct kent_device_quantity {
    const char *name; /* as in results: "gas_volume_m3"; NULL: nothing there */
    const char *word; /* for people: "gas volume" */
    kent_kind kind;
} kent_device_quantity;
/* [KENT_TOLD] of a kind of device; SI. */
const kent_device_quantity *kent_device_quantities(kent_device_kind kind);

/* Of one device at one instant. */
typedef struct kent_device_row {
    double flow; /* m3/s, as kent_device says */
    double told[KENT_TOLD];
} kent_device_row;

/* `count` instants after one another. Rows of [watch_count]; valid until the next call.
 */
typedef struct kent_trace {
    size_t count, watch_count, device_count;
    const double *time; /* [count] s */
    const double *head; /* [count][watch_count] m, piezometric */
    const double *flow; /* [count][watch_count] m3/s, positive along the span */
    const kent_device_row *devices; /* [count][device_count], the model's */
} kent_trace;

typedef struct kent_marcher kent_marcher;

/* scenario -1: no events, duration 0 s of its own. watches are copied. The steady state
 * is the first instant: the first advance returns t = 0. block: most instants one
 * advance may return, 1 .. 1024. m must outlive the marcher; s and grid need not. Fails
 * with KENT_E_INPUT (a watch off its span, a reach too long for its friction: place and
 * reaches needed are said, KENTLEDGE_SIMD names what the processor lacks) or
 * KENT_E_NOMEM. */
kent_status kent_marcher_new(const kent_model *m, const kent_steady *s,
                             const kent_grid *grid, int scenario,
                             const kent_watch *watches, size_t watch_count,
                             size_t block, kent_marcher **out, kent_error *err);
void kent_marcher_free(kent_marcher *k);

/* Advances by up to count instants (at most block). Returns how many; they are in
 * *trace. KENT_E_SOLVE in err where the march had to stop (a span left the stability
 * limit: place and reaches needed are said); then fewer are returned. */
size_t kent_marcher_advance(kent_marcher *k, size_t count, kent_trace *trace,
                            kent_error *err);

/* NULL, or what must be told of a device with the results, as a sentence goes on after
 * what it is and its id: "overflows; ..."; of all that happened so far. */
const char *kent_marcher_caution(const kent_marcher *k, size_t device);

/* Highest and lowest head so far at every grid point of a span, [reaches + 1] each, m.
 * Written to arrays of the caller's. */
void kent_marcher_envelope(const kent_marcher *k, int span, double *highest,
                           double *lowest);

/* Heads and flows (the mean of those before and after) now at every grid point of a
 * span, [reaches + 1] each. For tests. */
void kent_marcher_profile(const kent_marcher *k, int span, double *head, double *flow);

/* m3: what is hollow now at every grid point of a span, [reaches + 1]; at its first and
 * last one that of the whole node. Gas of places that sleep is not counted. */
void kent_marcher_hollow(const kent_marcher *k, int span, double *volume);

/* A cavity that opened at a grid point or an end. */
typedef struct kent_cavity {
    int span;          /* of the grid point; -1: at a node */
    int node;          /* -1: at a grid point inside a span */
    double chainage;   /* m from the span's start */
    double largest;    /* m3 */
    double largest_at; /* s */
    double opened;     /* s, first */
    double closed;     /* s, first time that it collapsed; NAN: not yet */
    double collapsed;  /* s, last; NAN: not yet */
    double pulse;      /* m: largest rise of head on a collapse; NAN: none yet */
    int count;         /* times that it opened */
} kent_cavity;

/* Every place where a cavity opened so far, largest first; at most `most` are written
 * to out. Returns how many there are. None with KENT_SEPARATION_NONE. */
size_t kent_marcher_cavities(const kent_marcher *k, kent_cavity *out, size_t most);

/* Where the head fell below the vapour limit at any instant: sets touched[point] for
 * every point at or next to such a grid point, and returns how many grid points did. */
size_t kent_marcher_below_vapour(const kent_marcher *k, bool *touched);

/* "base", "avx2" or "avx512": the kernel in use. KENTLEDGE_SIMD forces one for tests.
 */
const char *kent_marcher_kernel(const kent_marcher *k);

#endif
