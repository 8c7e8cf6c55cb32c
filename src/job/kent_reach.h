/* The highest and lowest pressure along a span in one case, and where. */
#ifndef KENT_REACH_H
#define KENT_REACH_H

#include "kent_job.h"

typedef struct kent_reached {
    double pressure; /* Pa gauge; NAN: nothing was found */
    double time;     /* s; NAN: outside marches, and between points */
    double chainage; /* m from the pipe's start */
    int point;       /* -1: between points */
    int span;
} kent_reached;

/* What is looked for. */
typedef enum kent_search {
    KENT_SEARCH_HIGHEST,
    KENT_SEARCH_LOWEST,
    KENT_SEARCH_OUTWARD /* the lowest less what ground water presses from outside */
} kent_search;

kent_reached kent_reach_nothing(void);

/* What goes further of two. */
kent_reached kent_reach_further(kent_search search, kent_reached a, kent_reached b);

/* head: m at the span's two ends, a straight line between them; levels are straight
 * between points, so that the extremes are at points. */
kent_reached kent_reach_of_line(const kent_model *m, int span, const double head[2],
                                kent_search search);

/* A place between points is named where it goes further than every point by more than 1
 * kPa; its pressure counts all the same. */
kent_reached kent_reach_of_march(const kent_model *m, const kent_scenario_result *run,
                                 int span, kent_search search);

#endif
