/* The devices of a march, and the clusters that they and their nodes make. */
#ifndef KENT_STANDS_INTERNAL_H
#define KENT_STANDS_INTERNAL_H

#include "kent_cluster_internal.h"

struct kent_stands {
    const kent_model *model;
    kent_device_state *states; /* [device_count] */
    bool *absent;              /* [device_count] left out by the scenario */
    kent_cluster *clusters;
    size_t cluster_count;
    int *cluster_of;       /* [node_count] -1: no cluster's */
    int *nodes;            /* [node_total] the model's, cluster by cluster */
    kent_member **members; /* [device_count] a device's; NULL: absent */
    double time;           /* s, of the last move */
    kent_error stopped;    /* the march cannot go on */
    kent_cluster_node *node_store;
    kent_member *member_store;
    double *room;
};

/* Devices from the steady state; e: whose levels, draws and gates stand there too.
 * scenario -1: nothing is left out. Fails with KENT_E_INPUT where a device does not
 * suit its steady state. */
kent_status kent_stands_new(const kent_model *m, const kent_steady *s, int scenario,
                            const kent_ends *e, kent_stands **out, kent_error *err);
void kent_stands_free(kent_stands *s);

/* To the step that ends at time (s) and lasts step (s). */
void kent_stands_move(kent_stands *s, const kent_schedule *schedule, double time,
                      double step);

/* From c and y of a cluster's nodes to their heads; its devices reach the new instant.
 * What stops the march is left in s->stopped. */
void kent_stands_solve(kent_stands *s, size_t cluster);

/* NULL, or what must be told of a device: kent_device_ops.caution. */
const char *kent_stands_caution(const kent_stands *s, size_t device);

/* [device_count] what devices show now. */
void kent_stands_tell(const kent_stands *s, kent_device_row *rows);

#endif
