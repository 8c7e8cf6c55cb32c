/* One cell of a standard table, as the case that it stands for. */
#ifndef KENT_STANDARD_INTERNAL_H
#define KENT_STANDARD_INTERNAL_H

#include "kent_standard.h"
#include "kent_tree.h"

/* Texts are borrowed. */
typedef struct kent_standard_fitting {
    kent_fitting_type type;
    const char *angle;       /* with its unit; NULL: none */
    const char *orientation; /* of a bend; NULL */
} kent_standard_fitting;

enum { KENT_STANDARD_TWIGS = 160 };

typedef struct kent_standard_cell {
    const kent_twig *root; /* the table's own group */
    const kent_twig *size; /* an id of a pipe class, or a group */
    const kent_twig *soil; /* an id of the catalogue, or a group */
    const char *soil_id;
    kent_standard_fitting fitting;
    double pressure; /* Pa */
    double outside;  /* m, of the pipe */
    kent_standard_what what;
    /* what the case is made of */
    kent_twig twigs[KENT_STANDARD_TWIGS];
    size_t used;
    char level[40], bore[40];
} kent_standard_cell;

/* The case's root; lives as long as the cell and the tree of the table. */
const kent_twig *kent_standard_case(kent_standard_cell *cell);

#endif
