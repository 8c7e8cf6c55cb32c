#include "kent_elimination_internal.h"

#include <klu.h>

#include <assert.h>
#include <stdlib.h>
#include <string.h>

/* One contribution of a derivative to the reduced matrix. */
typedef struct term {
    int row, column;
    size_t entry; /* of the full pattern */
    int span;     /* whose slope divides it; -1: none */
    double sign;
    int slot; /* where in the reduced matrix it is added */
} term;

struct kent_elimination {
    const kent_equations *eq;
    size_t kept; /* rows left: nodes and links */
    term *terms; /* [term_count] by column and row */
    size_t term_count;
    int *column_start, *row; /* reduced matrix by columns: [kept + 1], [..] */
    double *value;
    double *slope;   /* [spans] s/m2 */
    double *through; /* [entries] derivative to a span's flow, kept rows only, over its
                        slope */
    double *right;   /* [kept] */
    klu_common common;
    klu_symbolic *symbolic;
    klu_numeric *numeric;
};

void kent_elimination_free(kent_elimination *el)
{
    if (!el) return;
    (void)klu_free_numeric(&el->numeric, &el->common);
    (void)klu_free_symbolic(&el->symbolic, &el->common);
    free(el->terms);
    free(el->column_start);
    free(el->row);
    free(el->value);
    free(el->slope);
    free(el->through);
    free(el->right);
    free(el);
}

/* Row or column of the full system in the reduced one; -1: a span's. */
static int reduced(const kent_equations *eq, size_t i)
{
    if (i < eq->nodes) return (int)i;
    if (i < eq->nodes + eq->spans) return -1;
    return (int)(i - eq->spans);
}

static size_t count_terms(const kent_equations *eq)
{
    size_t count = 0;
    for (size_t i = 0; i < eq->size; i++) {
        if (reduced(eq, i) < 0) continue;
        for (int64_t k = eq->row[i]; k < eq->row[i + 1]; k++) {
            count += reduced(eq, (size_t)eq->column[k]) < 0 ? 2 : 1;
        }
    }
    return count;
}

/* dQ = (dHa - dHb - b) / slope put into every row that knows Q. (6.12) */
static void list_terms(kent_elimination *el)
{
    const kent_equations *eq = el->eq;
    term *t = el->terms;
    for (size_t i = 0; i < eq->size; i++) {
        const int row = reduced(eq, i);
        if (row < 0) continue;
        for (int64_t k = eq->row[i]; k < eq->row[i + 1]; k++) {
            const size_t j = (size_t)eq->column[k];
            const int column = reduced(eq, j);
            if (column >= 0) {
                *t++ = (term){row, column, (size_t)k, -1, 1.0, 0};
                continue;
            }
            const int span = (int)(j - eq->nodes);
            const int *node = eq->model->spans[span].node;
            *t++ = (term){row, node[0], (size_t)k, span, 1.0, 0};
            *t++ = (term){row, node[1], (size_t)k, span, -1.0, 0};
        }
    }
    assert(t == el->terms + el->term_count);
}

static int term_order(const void *a, const void *b)
{
    const term *s = a;
    const term *t = b;
    if (s->column != t->column) return s->column < t->column ? -1 : 1;
    if (s->row != t->row) return s->row < t->row ? -1 : 1;
    return (s->entry > t->entry) - (s->entry < t->entry);
}

/* Terms of one place share a slot. */
static void give_slots(kent_elimination *el)
{
    int slots = 0;
    for (size_t i = 0; i < el->term_count; i++) {
        term *t = &el->terms[i];
        const bool same = i > 0 && t[-1].column == t->column && t[-1].row == t->row;
        if (!same) {
            el->row[slots++] = t->row;
            el->column_start[t->column + 1]++;
        }
        t->slot = slots - 1;
    }
    for (size_t j = 0; j < el->kept; j++) {
        el->column_start[j + 1] += el->column_start[j];
    }
}

kent_status kent_elimination_new(const kent_equations *eq, kent_elimination **out)
{
    kent_status status = KENT_E_NOMEM;
    kent_elimination *el = kent_alloc(1, sizeof *el);

    if (!el) goto done;
    (void)klu_defaults(&el->common);
    el->eq = eq;
    el->kept = eq->nodes + eq->links;
    el->term_count = count_terms(eq);
    el->terms = kent_alloc(el->term_count, sizeof *el->terms);
    el->column_start = kent_alloc(el->kept + 1, sizeof *el->column_start);
    el->row = kent_alloc(el->term_count, sizeof *el->row);
    el->value = kent_alloc(el->term_count, sizeof *el->value);
    el->slope = kent_alloc(eq->spans, sizeof *el->slope);
    el->through = kent_alloc((size_t)eq->row[eq->size], sizeof *el->through);
    el->right = kent_alloc(el->kept, sizeof *el->right);
    if (!el->terms || !el->column_start || !el->row || !el->value || !el->slope ||
        !el->through || !el->right) {
        goto done;
    }
    list_terms(el);
    qsort(el->terms, el->term_count, sizeof *el->terms, term_order);
    give_slots(el);
    el->symbolic = klu_analyze((int)el->kept, el->column_start, el->row, &el->common);
    if (!el->symbolic) goto done;
    *out = el;
    el = NULL; /* handed over */
    status = KENT_OK;
done:
    kent_elimination_free(el);
    return status;
}

kent_status kent_elimination_factor(kent_elimination *el, const double *value)
{
    const kent_equations *eq = el->eq;

    for (size_t e = 0; e < eq->spans; e++) {
        el->slope[e] = -value[eq->row[eq->nodes + e] + 2];
    }
    memset(el->value, 0, el->term_count * sizeof *el->value);
    for (size_t i = 0; i < el->term_count; i++) {
        const term *t = &el->terms[i];
        double v = value[t->entry];
        if (t->span >= 0) {
            v /= el->slope[t->span];
            el->through[t->entry] = v;
        }
        el->value[t->slot] += t->sign * v;
    }
    (void)klu_free_numeric(&el->numeric, &el->common);
    el->numeric =
        klu_factor(el->column_start, el->row, el->value, el->symbolic, &el->common);
    if (el->numeric) return KENT_OK;
    return el->common.status == KLU_OUT_OF_MEMORY ? KENT_E_NOMEM : KENT_E_SOLVE;
}

/* Right-hand side of a kept row: b + sum A_k b_span / slope. (6.12) */
static double right_side(const kent_elimination *el, const double *b, size_t i)
{
    const kent_equations *eq = el->eq;
    double sum = b[i];
    for (int64_t k = eq->row[i]; k < eq->row[i + 1]; k++) {
        const size_t j = (size_t)eq->column[k];
        if (reduced(eq, j) < 0) sum += el->through[k] * b[j];
    }
    return sum;
}

kent_status kent_elimination_solve(kent_elimination *el, const double *b, double *x)
{
    const kent_equations *eq = el->eq;

    assert(el->numeric);
    for (size_t i = 0; i < eq->size; i++) {
        const int row = reduced(eq, i);
        if (row >= 0) el->right[row] = right_side(el, b, i);
    }
    if (!klu_solve(el->symbolic, el->numeric, (int)el->kept, 1, el->right,
                   &el->common)) {
        return KENT_E_SOLVE;
    }
    for (size_t e = 0; e < eq->spans; e++) { /* (6.13) */
        const int *node = eq->model->spans[e].node;
        const size_t i = eq->nodes + e;
        x[i] = (el->right[node[0]] - el->right[node[1]] - b[i]) / el->slope[e];
    }
    for (size_t i = 0; i < eq->size; i++) {
        const int row = reduced(eq, i);
        if (row >= 0) x[i] = el->right[row];
    }
    return KENT_OK;
}
