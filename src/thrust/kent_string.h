/* Strings: pipes joined so that nothing slips (fused, welded, flanged), which shorten
 * as one under pressure and cold, and the ends where they meet what can slip.
 *
 * A string is listed where any of it is fused or welded. At a point where two of its
 * legs meet it goes on, through bends, branches and valves bolted in; an adaptor that
 * slips, or a wall that holds it, ends it. */
#ifndef KENT_STRING_H
#define KENT_STRING_H

#include "kent_model.h"

typedef enum kent_string_end_kind {
    KENT_STRING_TO_JOINTS,     /* a pipe whose joints slip, or an adaptor */
    KENT_STRING_TO_RESTRAINED, /* a pipe whose joints have play, but hold */
    KENT_STRING_TO_WALL,       /* a tank's, or a wall that holds it */
    KENT_STRING_TO_DEVICE,     /* a pump, or a valve that discharges */
    KENT_STRING_TO_OPEN,       /* whatever lies beyond is not in the case */
    KENT_STRING_CLOSED         /* a dead end, which is the string's own */
} kent_string_end_kind;

/* The pressure at an end in one case. */
typedef struct kent_string_case {
    char name[KENT_ID + 16]; /* "test", "static", "shut-off", "steady", "future", or a
                                scenario's id */
    kent_name title;
    kent_case_kind kind;
    int scenario, state;  /* -1: none */
    double time;          /* s; NAN outside marches */
    double pressure;      /* Pa gauge, at the pipe's centre line; never below nil */
    double safety_factor; /* of that kind of case */
    bool lasts;           /* for days and years; else hours (test) or seconds (surge) */
} kent_string_case;

typedef struct kent_string_end {
    int string;               /* 0 .. string_count - 1 */
    int point, fitting, span; /* fitting -1: none stands there */
    double chainage, sign; /* m from the span's start; +1: the string leaves the point
                              towards the span's end */
    kent_string_end_kind kind;
    int beyond; /* span of the pipe beyond; -1 */
    double beyond_chainage, beyond_sign;
    kent_string_case *cases; /* [case_count] */
    size_t case_count;
} kent_string_end;

/* A stretch of one of a string's pipes. */
typedef struct kent_string_part {
    int string, pipe;
    double length; /* m */
} kent_string_part;

typedef struct kent_strings {
    double *length; /* [string_count] m, of all its pipes */
    size_t string_count;
    kent_string_part *parts; /* [part_count], of all strings */
    size_t part_count;
    kent_string_end *ends; /* [end_count] by string, then span and chainage */
    size_t end_count;
} kent_strings;

/* Without cases; clear it. */
kent_status kent_strings_find(const kent_model *m, kent_strings *out, kent_error *err);
void kent_strings_clear(kent_strings *s);

#endif
