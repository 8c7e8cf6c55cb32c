#include "kent_waves_internal.h"

#include <float.h>
#include <stdlib.h>
#include <string.h>

const double KENT_EXPLICIT_LIMIT = 0.25;

enum {
    SLACK_LEAST = 64,
    SLACK_MOST = 65536, /* places */
    LINE = 8,           /* doubles in a cache line */
    PAGE = 512,         /* doubles in a page */
    STAGGER = 168       /* doubles, whole lines */
};

/* The next array of `count` doubles out of the pool. Arrays start at different places
 * of a page: at the same place they would fight over the same lines of the cache and
 * cost the sweep a fifth of its speed. */
static double *cut(double **pool, size_t count)
{
    double *array = *pool;
    *pool += (count + PAGE - 1) / PAGE * PAGE + STAGGER;
    return array;
}

static bool cut_arrays(kent_waves *w)
{
    const size_t nodes = w->node_total, stored = nodes + w->slack;
    w->pool = kent_alloc(5 * (stored + PAGE + STAGGER) + LINE, sizeof *w->pool);
    if (!w->pool) return false;
    const size_t past = (uintptr_t)w->pool / sizeof(double) % LINE;
    double *pool = w->pool + (past ? LINE - past : 0);
    w->k = cut(&pool, nodes);
    w->twice_highest = cut(&pool, nodes);
    w->twice_lowest = cut(&pool, nodes);
    w->p_store = cut(&pool, stored);
    w->m_store = cut(&pool, stored);
    w->p = w->p_store + w->slack;
    w->m = w->m_store;
    return true;
}

/* Explicit spans first, each kind in the model's order. */
static void place_spans(kent_waves *w, const bool *implicit)
{
    size_t next = 0;
    for (int pass = 0; pass < 2; pass++) {
        for (size_t s = 0; s < w->span_count; s++) {
            if (implicit[s] != (pass == 1)) continue;
            w->first[s] = next;
            next += w->reaches[s] + 1;
        }
        if (pass == 0) w->explicit_total = next;
    }
}

static size_t blocks_of(size_t nodes) { return (nodes + KENT_BLOCK - 1) / KENT_BLOCK; }

kent_status kent_waves_watch(kent_waves *w, kent_error *err)
{
    w->explicit_blocks = blocks_of(w->explicit_total);
    w->block_total = w->explicit_blocks + blocks_of(w->node_total - w->explicit_total);
    w->floors = kent_alloc(w->block_total, sizeof *w->floors);
    w->low = kent_alloc(w->block_total, sizeof *w->low);
    w->awake = kent_alloc(w->block_total, sizeof *w->awake);
    return w->floors && w->low && w->awake ? KENT_OK : kent_error_nomem(err);
}

size_t kent_waves_block(const kent_waves *w, size_t block, size_t *count)
{
    const size_t e = w->explicit_total;
    const bool explicit = block < w->explicit_blocks;
    const size_t first =
        explicit ? block * KENT_BLOCK : e + (block - w->explicit_blocks) * KENT_BLOCK;
    const size_t left = (explicit ? e : w->node_total) - first;
    *count = left < KENT_BLOCK ? left : KENT_BLOCK;
    return first;
}

kent_status kent_waves_new(const kent_model *m, const kent_grid *grid,
                           const bool *implicit, kent_waves **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    const size_t spans = m->span_count, nodes = grid->node_total;
    kent_waves *w = kent_alloc(1, sizeof *w);

    if (!w) goto done;
    w->node_total = nodes;
    w->span_count = spans;
    w->slack = nodes / 4;
    if (w->slack < SLACK_LEAST) w->slack = SLACK_LEAST;
    if (w->slack > SLACK_MOST) w->slack = SLACK_MOST;
    w->first = kent_alloc(spans, sizeof *w->first);
    w->reaches = kent_alloc(spans, sizeof *w->reaches);
    w->impedance = kent_alloc(spans, sizeof *w->impedance);
    if (!w->first || !w->reaches || !w->impedance || !cut_arrays(w)) goto done;
    for (size_t s = 0; s < spans; s++) {
        w->reaches[s] = (size_t)grid->reaches[s];
        w->impedance[s] =
            grid->wave_speed_used[s] / (m->gravity * m->spans[s].area); /* 7.4 */
    }
    place_spans(w, implicit);
    *out = w;
    w = NULL;
    status = KENT_OK;
done:
    kent_waves_free(w);
    return status == KENT_OK ? KENT_OK : kent_error_nomem(err);
}

void kent_waves_free(kent_waves *w)
{
    if (!w) return;
    free(w->first);
    free(w->reaches);
    free(w->impedance);
    free(w->floors);
    free(w->low);
    free(w->awake);
    free(w->pool);
    free(w);
}

void kent_waves_set(kent_waves *w, size_t span, const double head[2], double flow)
{
    const size_t reaches = w->reaches[span];
    const double bq = w->impedance[span] * flow;
    for (size_t i = 0; i <= reaches; i++) {
        const size_t node = w->first[span] + i;
        const double share = (double)i / (double)reaches;
        const double h = (1.0 - share) * head[0] + share * head[1];
        w->p[node] = h + bq;
        w->m[node] = h - bq;
        w->twice_highest[node] = w->twice_lowest[node] = w->p[node] + w->m[node];
    }
}

/* The first block from `block` to before `end` that is awake, or is not. */
static size_t next_block(const kent_waves *w, size_t block, size_t end, int awake)
{
    const uint8_t *at =
        block < end ? memchr(w->awake + block, awake, end - block) : NULL;
    return at ? (size_t)(at - w->awake) : end;
}

/* The sleeping blocks from `block` to before `end`, a run at a time. */
static int64_t sweep_sleepers(kent_waves *w, kent_watching_sweep *sweep, double limit,
                              size_t block, size_t end)
{
    int64_t beyond = 0;
    while ((block = next_block(w, block, end, 0)) < end) {
        const size_t from = block;
        size_t count = 0;
        block = next_block(w, block, end, 1);
        const size_t first = kent_waves_block(w, from, &count);
        const size_t nodes = kent_waves_block(w, block - 1, &count) + count - first;
        beyond += sweep(nodes, limit, w->k + first, w->p + first, w->m + first,
                        w->twice_highest + first, w->twice_lowest + first,
                        w->floors + from, w->low + from);
    }
    return beyond;
}

int64_t kent_waves_sweep(kent_waves *w, const kent_kernel *kernel)
{
    const size_t e = w->explicit_total;
    int64_t beyond = 0;
    if (w->block_total > 0) {
        beyond += sweep_sleepers(w, kernel->explicit_watch, KENT_EXPLICIT_LIMIT, 0,
                                 w->explicit_blocks);
        beyond += sweep_sleepers(w, kernel->implicit_watch, DBL_MAX, w->explicit_blocks,
                                 w->block_total);
    } else {
        beyond += kernel->explicit_sweep(e, KENT_EXPLICIT_LIMIT, w->k, w->p, w->m,
                                         w->twice_highest, w->twice_lowest);
        beyond +=
            kernel->implicit_sweep(w->node_total - e, DBL_MAX, w->k + e, w->p + e,
                                   w->m + e, w->twice_highest + e, w->twice_lowest + e);
    }
    return beyond;
}

/* 7.8: the node to the right receives p, the node to the left m. */
void kent_waves_move(kent_waves *w)
{
    const size_t bytes = w->node_total * sizeof *w->p;
    if (w->p == w->p_store) {
        w->p = w->p_store + w->slack;
        memmove(w->p, w->p_store, bytes);
    }
    if (w->m == w->m_store + w->slack) {
        memmove(w->m_store, w->m, bytes);
        w->m = w->m_store;
    }
    w->p -= 1;
    w->m += 1;
}

double kent_waves_head(const kent_waves *w, size_t node)
{
    return 0.5 * (w->p[node] + w->m[node]);
}

double kent_waves_flow(const kent_waves *w, size_t span, size_t node)
{
    return (w->p[node] - w->m[node]) / (2.0 * w->impedance[span]);
}
