/* One balance being written as a hand calculation. Only thrust/ looks inside. */
#ifndef KENT_SHEET_INTERNAL_H
#define KENT_SHEET_INTERNAL_H

#include "kent_loads.h"

typedef struct kent_sheet {
    const kent_model *model;
    const kent_fitting *fitting;
    kent_port ports[KENT_PORTS]; /* [count], of the case */
    size_t count, widest;
    const kent_load_case *load;
    const kent_instant *instant;
    bool moving;          /* at least one port has a stream */
    kent_source geometry; /* where directions come from */
    kent_derivation *d;
} kent_sheet;

/* A symbol or formula with a port's number in it: "p_2". */
typedef struct kent_words {
    char s[160];
} kent_words;

__attribute__((format(printf, 1, 2))) kent_words kent_say(const char *fmt, ...);

void kent_sheet_heading(const kent_sheet *s, kent_words w);
void kent_sheet_put(const kent_sheet *s, kent_words symbol, double value,
                    kent_kind kind, kent_source source, const char *says);
void kent_sheet_work(const kent_sheet *s, kent_words symbol, double value,
                     kent_kind kind, kent_words formula, const char *equation,
                     const char *says);

/* The check line of the fitting's type, or the words that there is none; of a group
 * what couple is left; of a curve its side load. */
void kent_sheet_check(const kent_sheet *s);

#endif
