/* A place on a pipe and a way along it, which goes on from pipe to pipe. */
#ifndef KENT_ALONG_H
#define KENT_ALONG_H

#include "kent_model.h"

/* m: places nearer than this along a pipe are one place. */
#define KENT_SAME_PLACE 1e-6

typedef struct kent_along {
    int pipe;
    bool ahead; /* from the pipe's start to its end */
    double at;  /* m from the pipe's start */
} kent_along;

kent_along kent_along_of(const kent_model *m,
                         const kent_port *port);             /* out of a fitting */
double kent_along_left(const kent_model *m, kent_along way); /* m to the pipe's end */
double kent_along_place(kent_along way, double away); /* m from the pipe's start */

/* Where the pipe ends and one other of the same outside diameter goes on, straight or
 * round a bend: the way along that. Returns false where none does. */
bool kent_along_on(const kent_model *m, kent_along way, kent_along *next);

/* m of rise per metre of pipe along the way at a distance (m), + uphill, -1 .. 1: of
 * the stretch just beyond, or just before it. */
double kent_along_rise(const kent_model *m, kent_along way, double away, bool beyond);

/* The first span of a pipe; those of one pipe follow each other. */
size_t kent_pipe_first_span(const kent_model *m, int pipe);
/* The span of a pipe in which a chainage (m) of it lies; at a node the one before. */
size_t kent_pipe_span_at(const kent_model *m, int pipe, double chainage);
double kent_span_start(const kent_model *m,
                       const kent_span *span);        /* m along its pipe */
double kent_pipe_laid(const kent_model *m, int pipe); /* m, of it all */

/* Of `count` stops from `first` on, the first whose chainage from there (m) is not
 * below this one; first + count where all are. */
size_t kent_stop_search(const kent_model *m, size_t first, size_t count,
                        double chainage);

#endif
