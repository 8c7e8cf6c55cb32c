/* What fades: the states behind friction that remembers and walls that creep.
 *
 * Both are a sum over terms that each keep one number v per node: fed by x it becomes
 *
 *     v <- fade v + gain x,    sum <- sum of v over the terms                   (16.14)
 *
 * and before x is known the sum of the last step tells what is left of the past. Each
 * pass works between two numbers of the same node at one instant, so that it can give
 * nothing back that was not taken before (16.18, 16.24). */
#ifndef KENT_FADE_INTERNAL_H
#define KENT_FADE_INTERNAL_H

#include <stddef.h>

/* One span's share of a pass. */
typedef struct kent_fade {
    size_t first, nodes; /* its nodes in the waves' arrays */
    size_t terms;
    const double *fade, *gain; /* [terms] */
    double share;              /* -, of x that acts at once */
    double *v;                 /* [terms][nodes] m */
    double *sum;               /* [nodes] m */
    double *past; /* [nodes] m: d as the last step had it; of a wall p + m at rest */
} kent_fade;

typedef void kent_fade_pass(const kent_fade *f, double *restrict p, double *restrict m);

enum { KENT_FADE_CHUNK = 128 }; /* nodes whose x are at hand at a time */

static inline __attribute__((always_inline)) void
kent_fade_terms(const kent_fade *f, size_t from, size_t n, const double *restrict x)
{
    double *restrict sum = f->sum + from;
    for (size_t i = 0; i < n; i++) {
        sum[i] = 0.0;
    }
    for (size_t term = 0; term < f->terms; term++) {
        const double fade = f->fade[term], gain = f->gain[term];
        double *restrict v = f->v + term * f->nodes + from;
        for (size_t i = 0; i < n; i++) {
            v[i] = fade * v[i] + gain * x[i];
            sum[i] += v[i];
        }
    }
}

/* Friction: 16.15. p and m point to the span's first node. */
static inline __attribute__((always_inline)) void
kent_fade_recall(const kent_fade *f, double *restrict p, double *restrict m)
{
    double x[KENT_FADE_CHUNK];
    const double share = f->share, part = 1.0 / (1.0 + share);
    for (size_t from = 0; from < f->nodes; from += KENT_FADE_CHUNK) {
        const size_t left = f->nodes - from;
        const size_t n = left < KENT_FADE_CHUNK ? left : KENT_FADE_CHUNK;
        double *restrict a = p + from, *restrict b = m + from;
        double *restrict past = f->past + from;
        const double *restrict sum = f->sum + from;
        for (size_t i = 0; i < n; i++) {
            const double d = a[i] - b[i];
            const double pull = (sum[i] + share * (d - past[i])) * part;
            x[i] = (d - pull) - past[i];
            past[i] = d - pull;
            a[i] -= pull;
            b[i] += pull;
        }
        kent_fade_terms(f, from, n, x);
    }
}

/* Walls: 16.23. */
static inline __attribute__((always_inline)) void
kent_fade_yield(const kent_fade *f, double *restrict p, double *restrict m)
{
    double x[KENT_FADE_CHUNK];
    const double share = f->share, part = 1.0 / (1.0 + 0.5 * share);
    for (size_t from = 0; from < f->nodes; from += KENT_FADE_CHUNK) {
        const size_t left = f->nodes - from;
        const size_t n = left < KENT_FADE_CHUNK ? left : KENT_FADE_CHUNK;
        double *restrict a = p + from, *restrict b = m + from;
        const double *restrict past = f->past + from;
        const double *restrict sum = f->sum + from;
        for (size_t i = 0; i < n; i++) {
            const double h = 0.5 * (a[i] + b[i] - past[i]);
            const double loss = (share * h - sum[i]) * part;
            x[i] = h - 0.5 * loss;
            a[i] -= loss;
            b[i] -= loss;
        }
        kent_fade_terms(f, from, n, x);
    }
}

#endif
