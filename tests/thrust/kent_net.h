/* A model with its steady state and a recorder, and traces made by hand for it. */
#ifndef KENT_NET_H
#define KENT_NET_H

#include "kent_build.h"
#include "kent_loads.h"

typedef struct kent_net {
    kent_build build;
    const kent_model *model;
    kent_steady *steady, **states; /* the recorder's list of one, which must not move */
    kent_recorder *recorder;
    kent_loads_result *loads;
    const kent_watch *watches;
    size_t watch_count;
} kent_net;

/* Derives what was built, solves its steady state and makes a recorder; takes over the
 * builder. Fails the test where any of it does not work. */
kent_net kent_net_of(kent_build build);
void kent_net_clear(kent_net *n);

/* Works out the load cases anew. */
void kent_net_finish(kent_net *n);

/* A case of a fitting by both names; fails the test where there is none. */
const kent_load_case *kent_net_case(const kent_net *n, const char *fitting,
                                    const char *name);
const kent_fitting *kent_net_fitting(const kent_net *n, const char *id);

enum { KENT_NET_ROWS = 1200, KENT_NET_WATCHES = 24 };

/* Instants made by hand, step apart; heads and flows of every watch. */
typedef struct kent_made {
    size_t count, watch_count;
    double time[KENT_NET_ROWS];
    double head[KENT_NET_ROWS * KENT_NET_WATCHES];
    double flow[KENT_NET_ROWS * KENT_NET_WATCHES];
} kent_made;

/* Adds an instant with one head (m) and one flow (m3/s) at every watch. */
void kent_made_add(kent_made *t, const kent_net *n, double time, double head,
                   double flow);

/* Gives the recorder these instants, at most `block` at once. */
void kent_made_take(const kent_made *t, kent_net *n, int scenario, double step,
                    size_t block);

#endif
