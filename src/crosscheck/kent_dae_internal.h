/* The whole network as one system F(t, y, y') = 0: invariants of every cell (m), heads
 * of nodes (m), flows (m3/s) and states of links; chapter 17. */
#ifndef KENT_DAE_INTERNAL_H
#define KENT_DAE_INTERNAL_H

#include "kent_passage_internal.h"
#include "kent_second.h"
#include "kent_strand_internal.h"

#include <stdint.h>

typedef struct kent_reach {        /* a span in cells */
    kent_strand strand[2];         /* [0] leaves its start, [1] its end */
    double per_cell;               /* 1/s: a/dx */
    double wave_speed;             /* m/s */
    double conductance;            /* m2/s: gA/a */
    const kent_friction *friction; /* NULL: by `steady` */
    double steady;                 /* s2/m6: slope = steady Q|Q| */
    double minor;                  /* s2/m6, the same of losses spread along it */
} kent_reach;

typedef struct kent_dae {
    const kent_model *model;
    kent_passages *links;
    kent_reach *reach;  /* [span_count] */
    size_t cells;       /* of all spans */
    size_t nodes;       /* index of the first node's head */
    size_t size;        /* unknowns */
    size_t entry_count; /* of the derivatives as they are worked out */
    size_t *slot;       /* [entry_count] where each is added, in the matrix */
    int64_t *row;       /* [size + 1] compressed rows of the matrix */
    int64_t *column;    /* [row[size]] */
} kent_dae;

/* Of a main in the state that s was found for; scenario -1: nothing happens. Every span
 * has at least KENT_STRAND_CELLS cells. */
kent_status kent_dae_new(const kent_model *m, const kent_steady *s, int scenario,
                         const kent_mesh *mesh, kent_dae **out, kent_error *err);
void kent_dae_free(kent_dae *d);

/* The steady state. y: [size]. */
void kent_dae_start(const kent_dae *d, const kent_steady *s, double *y);

/* What of each unknown is as much as 1 m of head, and whether its rate stands in the
 * equations. [size] each; changing is 1 or 0. */
void kent_dae_scales(const kent_dae *d, double *scale, double *changing);

void kent_dae_residual(const kent_dae *d, double time, const double *y,
                       const double *rate, double *f);

/* dF/dy + c dF/dy' in compressed rows: value [row[size]]. */
void kent_dae_derivatives(const kent_dae *d, double time, const double *y, double c,
                          double *value);

/* Unknowns of a link, KENT_PASSAGE_UNKNOWNS of them. */
void kent_dae_gather(const kent_dae *d, const kent_passage *l, const double *y,
                     double *u);

/* m: head at a chainage of a span. */
double kent_dae_head(const kent_dae *d, const double *y, int span, double chainage);

#endif
