/* Where each point of a main is looked at: the watches behind peaks and histories. */
#ifndef KENT_VIEWPOINT_H
#define KENT_VIEWPOINT_H

#include "kent_loads.h"

/* One watched place and the point it shows. A point with something in line has two. */
typedef struct kent_viewpoint {
    int point;
    double
        flow_sign; /* +1, or -1 where the flow through a device runs against the span */
    bool second;   /* the far side of what is in line: for peaks, not for histories */
    int device;    /* whose flow is shown; -1: the span's */
} kent_viewpoint;

/* Every place a march must show, in order: first the recorder's own, then the points'.
 */
typedef struct kent_viewpoints {
    kent_watch *watches; /* [recorder_count + count] */
    size_t recorder_count;
    kent_viewpoint *views; /* [count], the watches after the recorder's */
    size_t count;
    int *history; /* [history_count] indices of views whose history is kept */
    size_t history_count;
    bool history_cut; /* more were wanted than KENT_HISTORY_PLACES */
} kent_viewpoints;

/* Histories of more places than this are not kept: each extreme holds a row of its own.
 */
enum { KENT_HISTORY_PLACES = 400 };

/* Histories: points with a fitting or a device, and those with record = true. */
kent_status kent_viewpoints_new(const kent_model *m, const kent_recorder *recorder,
                                kent_viewpoints **out, kent_error *err);
void kent_viewpoints_free(kent_viewpoints *v);

#endif
