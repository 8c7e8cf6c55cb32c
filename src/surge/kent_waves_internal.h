/* Every node's arriving characteristics, all spans end to end in one array each.
 *
 * Only surge/ knows this layout. Spans whose friction is explicit come first, so that
 * each kind is one sweep. p and m move by one place a step inside stores with slack;
 * when the slack is used up they are moved back. */
#ifndef KENT_WAVES_INTERNAL_H
#define KENT_WAVES_INTERNAL_H

#include "kent_grid.h"
#include "kent_kernel_internal.h"

typedef struct kent_waves {
    size_t node_total, span_count;
    size_t
        explicit_total; /* nodes of the spans swept explicitly: 0 .. explicit_total */
    size_t *first;      /* [span_count] a span's first node */
    size_t *reaches;    /* [span_count] */
    double *impedance;  /* [span_count] B = a/(g A), s/m2 */
    double *k;          /* [node_total] 1/m, friction: 7.7 */
    double *twice_highest, *twice_lowest; /* [node_total] m */
    double *p, *m;                        /* [node_total] m, inside their stores */
    double *p_store, *m_store;            /* [node_total + slack] */
    double *pool;                         /* all of the above: one block of memory */
    size_t slack;
    /* Where low heads are watched for; else block_total is 0 and the rest NULL. Blocks
     * of KENT_BLOCK nodes, those of the explicit spans first. */
    size_t block_total, explicit_blocks;
    kent_floor *floors; /* [block_total] of sleeping blocks */
    uint8_t *low;       /* [block_total] 1: a floor was crossed; whoever looks clears */
    uint8_t *awake;     /* [block_total] 1: swept by kent_cavities, not by the kernel */
} kent_waves;

/* Largest R|Q|/(2B) of an explicit reach, beyond which friction overshoots (7.9). */
extern const double KENT_EXPLICIT_LIMIT;

/* implicit: [span_count] which spans are swept point-implicitly. */
kent_status kent_waves_new(const kent_model *m, const kent_grid *grid,
                           const bool *implicit, kent_waves **out, kent_error *err);
void kent_waves_free(kent_waves *w);

/* From now on low heads are watched for, in blocks. Every block sleeps. */
kent_status kent_waves_watch(kent_waves *w, kent_error *err);

/* A straight grade line between two heads (m) and one flow (m3/s) along a span. */
void kent_waves_set(kent_waves *w, size_t span, const double head[2], double flow);

/* Friction and envelopes of all nodes but those of blocks that are awake. Returns the
 * number of nodes left untouched because they were beyond the limit (or not a number).
 */
int64_t kent_waves_sweep(kent_waves *w, const kent_kernel *kernel);

/* The nodes of a block, and the block of a node. */
size_t kent_waves_block(const kent_waves *w, size_t block, size_t *count);
static inline size_t kent_waves_block_of(const kent_waves *w, size_t node)
{
    return node < w->explicit_total
               ? node / KENT_BLOCK
               : w->explicit_blocks + (node - w->explicit_total) / KENT_BLOCK;
}

/* To the next instant: what leaves a node belongs to its neighbours. */
void kent_waves_move(kent_waves *w);

/* m and m3/s at a node. */
double kent_waves_head(const kent_waves *w, size_t node);
double kent_waves_flow(const kent_waves *w, size_t span, size_t node);

#endif
