/* Column separation: where the water boils, at grid points and at nodes.
 *
 * At a grid point in a hollow the waves that arrive no longer give the head: the law of
 * the hollow does (kent_hollow_internal.h), and
 *
 *     flow in  (p - H)/B,         flow out (H - m)/B,
 *     leaves to the left 2H - p,  leaves to the right 2H - m                   (15.8)
 *
 * each of which then loses its own friction. Without a hollow H = (p + m)/2 and these
 * are m and p again, which is what the kernel sweeps.
 *
 * Nearly all of a main is never low. So blocks of KENT_BLOCK nodes sleep: the kernel
 * sweeps them and marks those that might be low at the next instant; such a block is
 * looked at, wakes where it is, and sleeps again when all of it stands high and none of
 * its cavities is open (15.9, 15.10). Nodes wake and sleep by themselves, but those of
 * clusters, which never sleep. A fixed level never boils. */
#ifndef KENT_CAVITIES_INTERNAL_H
#define KENT_CAVITIES_INTERNAL_H

#include "kent_drag_internal.h"
#include "kent_marcher.h"
#include "kent_stands_internal.h"

/* m above the limit: a head below the one wakes, all heads above the other let sleep.
 */
typedef struct kent_cavity_heights {
    double wakes, sleeps;
} kent_cavity_heights;
extern const kent_cavity_heights KENT_CAVITY_HEIGHTS;
/* Free gas by volume at one atmosphere in KENT_SEPARATION_GAS. */
extern const double KENT_CAVITY_GAS;
/* Of its reach, a cavity is listed once it takes so much; it has closed when it takes
 * half of that. */
extern const double KENT_CAVITY_LISTED;

/* What became of one place. */
typedef struct kent_pocket {
    double largest, largest_at, opened, closed, collapsed, pulse; /* as kent_cavity */
    double peak;                                                  /* m: rise so far */
    int count;
    bool open, rising; /* rising: closed just now, and the head still goes up */
} kent_pocket;

typedef struct kent_cavity_span { /* of a grid point inside it */
    double room;                  /* m2: dt 2/B */
    double gas;                   /* m4 */
    double listed;                /* m3 */
    size_t first, reaches;
} kent_cavity_span;

typedef struct kent_hole { /* of a knot */
    kent_hollow hollow;
    double listed; /* m3 */
    kent_pocket pocket;
    bool awake; /* said of no cluster's */
} kent_hole;

typedef struct kent_cavities {
    const kent_model *model; /* the marcher's, like ends */
    kent_ends *ends;
    kent_cavity_heights heights;
    kent_cavity_span *spans;       /* [span_count] as they lie in memory */
    int *span_index;               /* [span_count] the model's index of each */
    size_t *block_span;            /* [block_total] the first one in a block */
    double *block_limit;           /* [block_total] m: of its highest point */
    uint8_t *busy;                 /* [block_total] a pocket is open or rising */
    uint8_t *drowsy;               /* [block_total] it may sleep at the next instant */
    double *limit, *head, *volume; /* [node_total] m, m, m3; head: of those awake */
    double *lean;                  /* [node_total] m: of kent_cavities_show */
    kent_pocket *pockets;          /* [node_total] */
    kent_hole *holes;              /* [knot_count] */
    uint32_t *knot_node;           /* [knot_count] of its first tip */
    double *knot_wakes;            /* [knot_count] m: the head that wakes it */
    size_t awake_blocks, awake_knots; /* knots of clusters not counted */
} kent_cavities;

/* w must hold the steady state: whatever is low there wakes. step: s. */
kent_status kent_cavities_new(const kent_model *m, double step,
                              kent_cavity_heights heights, kent_waves *w, kent_ends *e,
                              kent_cavities **out, kent_error *err);
void kent_cavities_free(kent_cavities *c);

/* After kent_ends_solve: heads and volumes of all that is low, at time (s). */
void kent_cavities_solve(kent_cavities *c, kent_waves *w, double time);

/* Friction and envelopes of the blocks that are awake, before kent_waves_sweep. Returns
 * how many nodes were beyond the limit; they keep the flow that was. */
int64_t kent_cavities_sweep(const kent_cavities *c, const kent_drag *drag,
                            kent_waves *w);

/* What leaves an awake node adds up to more than twice its head where its cavity grows.
 * Whoever reads heads out of p + m after the sweep wants show before and hide after. */
void kent_cavities_show(kent_cavities *c, kent_waves *w);
void kent_cavities_hide(kent_cavities *c, kent_waves *w);

/* m, at a node. */
static inline double kent_cavities_head(const kent_cavities *c, const kent_waves *w,
                                        size_t node)
{
    return w->awake[kent_waves_block_of(w, node)] ? c->head[node]
                                                  : kent_waves_head(w, node);
}

/* m3: what is hollow now at a node inside a span; nil where it sleeps. */
static inline double kent_cavities_volume(const kent_cavities *c, const kent_waves *w,
                                          size_t node)
{
    return w->awake[kent_waves_block_of(w, node)] ? c->volume[node] : 0.0;
}

/* m3: the same at a node of the model. */
double kent_cavities_at_node(const kent_cavities *c, int node);

/* As kent_marcher_cavities. */
size_t kent_cavities_list(const kent_cavities *c, kent_cavity *out, size_t most);

#endif
