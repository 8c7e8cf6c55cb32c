/* Linear systems of a Newton step: span flows are eliminated one by one, what is left
 * (heads and link flows) is factored by KLU. (6.11) .. (6.13) */
#ifndef KENT_ELIMINATION_INTERNAL_H
#define KENT_ELIMINATION_INTERNAL_H

#include "kent_equations_internal.h"

typedef struct kent_elimination kent_elimination;

/* Keeps eq's pattern by reference. KENT_E_NOMEM. */
kent_status kent_elimination_new(const kent_equations *eq, kent_elimination **out);
void kent_elimination_free(kent_elimination *el);

/* value: [row[size]] derivatives in eq's order; copied where needed. KENT_E_SOLVE: the
 * matrix is singular; KENT_E_NOMEM. */
kent_status kent_elimination_factor(kent_elimination *el, const double *value);

/* Solves with the values last factored: b, x [size], which may be one array. */
kent_status kent_elimination_solve(kent_elimination *el, const double *b, double *x);

#endif
