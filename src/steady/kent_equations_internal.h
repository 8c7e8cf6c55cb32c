/* The equations of steady flow and their analytic derivatives, on plain arrays
 * (docs/theory/06-steady.md).
 *
 * Unknowns x and equations f have the same layout: one per node (head, m; net inflow or
 * level), one per span (flow, m3/s; energy), one per link (flow, m3/s; its law). */
#ifndef KENT_EQUATIONS_INTERNAL_H
#define KENT_EQUATIONS_INTERNAL_H

#include "kent_link_internal.h"

#include <stddef.h>
#include <stdint.h>

typedef struct kent_equations {
    const kent_model *model;
    size_t nodes, spans, links, size; /* size: their sum */
    kent_link *link; /* [links] valves, outflows, devices, pumps' standing units */
    size_t first_outflow, first_device, first_standing; /* of link */
    int *fixed_level;    /* [nodes] index, or -1: a free node */
    double *entry;       /* [nodes] s2/m5, (1 + loss)/(2 g A^2) of a fixed level */
    double *least_slope; /* [spans] s/m2, below which no derivative is taken */
    double flow_scale;   /* m3/s, of 1 m/s in the largest span */
    /* pattern of the derivatives, by rows */
    int64_t *row;    /* [size + 1] where each row starts */
    int64_t *column; /* [row[size]] */
    double *sign;    /* [row[size]] in a node's row: +1 where the flow arrives */
} kent_equations;

/* Laws of valves and outflows are as the case states them; those of devices as of
 * kent_duty_start. */
kent_status kent_equations_new(const kent_model *m, kent_equations **out,
                               kent_error *err);
void kent_equations_free(kent_equations *eq);

/* Where the search starts: 1 m/s in every span, heads at the highest fixed level. */
void kent_equations_start(const kent_equations *eq, double *x);

/* f at x, [size] each: m3/s net inflow at free nodes, m elsewhere (m3/s at links that
 * pass a given flow). */
void kent_equations_residual(const kent_equations *eq, const double *x, double *f);

/* Derivatives of f at x, [row[size]] in the pattern's order. */
void kent_equations_derivatives(const kent_equations *eq, const double *x,
                                double *value);

/* Whether equation i is measured in m3/s; the others are in m. */
bool kent_equations_is_flow(const kent_equations *eq, size_t i);

#endif
