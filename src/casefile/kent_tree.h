/* A case's text as a tree of settings, each with its file and line. Made by libconfig,
 * which is known here alone; a table makes twigs of its rows. */
#ifndef KENT_TREE_H
#define KENT_TREE_H

#include "kent_files.h"

typedef enum kent_twig_type {
    KENT_TWIG_GROUP, /* { } */
    KENT_TWIG_LIST,  /* ( ) or [ ] */
    KENT_TWIG_TEXT,
    KENT_TWIG_WHOLE,  /* a number without decimal point */
    KENT_TWIG_NUMBER, /* one with it */
    KENT_TWIG_SWITCH
} kent_twig_type;

/* One setting. Read it through the functions below; whoever makes one fills what its
 * type has. */
typedef struct kent_twig {
    kent_twig_type type;
    kent_place place;
    const char *name;                 /* "" in a list */
    const char *text;                 /* of a text */
    double number;                    /* of a number; of a switch: 1 true, 0 false */
    const struct kent_twig *children; /* [count] of a group or a list */
    size_t count;
} kent_twig;

/* Its twigs and their texts live as long as it does. */
typedef struct kent_tree kent_tree;

/* Scans and parses path ("-": standard input). Fails with KENT_E_INPUT (complaints were
 * added), KENT_E_IO or KENT_E_NOMEM (err). *out is the caller's. */
kent_status kent_tree_read(const char *path, kent_tree **out,
                           kent_complaints *complaints, kent_error *err);
void kent_tree_free(kent_tree *t);

const kent_twig *kent_tree_root(const kent_tree *t);
kent_files *kent_tree_files(kent_tree *t); /* a table adds to them */
size_t kent_tree_file_count(const kent_tree *t);
const char *kent_tree_file(const kent_tree *t, size_t index);
unsigned long long kent_tree_checksum(const kent_tree *t);
kent_place kent_tree_place(const kent_tree *t, const kent_twig *twig);

kent_twig_type kent_twig_type_of(const kent_twig *twig);
const char *kent_twig_type_word(const kent_twig *twig); /* "a group", "a number" ... */
const char *kent_twig_name(const kent_twig *twig);      /* "" in a list */
size_t kent_twig_count(const kent_twig *twig);          /* children; 0 for a value */
const kent_twig *kent_twig_child(const kent_twig *twig, size_t index);
const kent_twig *kent_twig_member(const kent_twig *twig, const char *name); /* NULL */

const char *kent_twig_text(const kent_twig *twig); /* NULL: not a text */
double kent_twig_number(const kent_twig *twig);    /* NAN: not a number */
bool kent_twig_is_true(const kent_twig *twig);

#endif
