/* A cluster: nodes with no pipe between them, and what stands there, solved together.
 *
 * A member passes one flow q from its side 0 to its side 1; a side is one of the
 * cluster's nodes or a head that stands. Since a node's pipes bring Y (C - H) (7.13),
 *
 *     H = C - (what its members take)/Y                                        (12.1)
 *
 * and flows alone are unknown: one law f(q, H0(q), H1(q)) = 0 for each member (12.2).
 * Newton's method with a line search, from the flows of the instant before; where it
 * makes no way, one member after another between brackets (docs/theory/12-clusters.md).
 * Nothing is allocated; the same numbers give the same bits. */
#ifndef KENT_CLUSTER_INTERNAL_H
#define KENT_CLUSTER_INTERNAL_H

#include "kent_device_internal.h"
#include "kent_ends_internal.h"
#include "kent_hollow_internal.h"

typedef enum kent_member_kind {
    KENT_MEMBER_DEVICE,
    KENT_MEMBER_LEVEL,
    KENT_MEMBER_DRAW,
    KENT_MEMBER_GATE,
    KENT_MEMBER_HOLLOW /* what flows out of it makes its node's cavity smaller */
} kent_member_kind;

typedef struct kent_member {
    kent_member_kind kind;
    int side[2];    /* into the cluster's nodes; -1: none */
    double head[2]; /* m: what stands where there is no node, else the answer's */
    double flow;    /* m3/s, of the last answer */
    /* by kind */
    const kent_device_ops *ops;
    kent_device_state *state;
    int device; /* the model's; -1 */
    const kent_level *level;
    const kent_draw *draw;
    const kent_gate *gate;
    const kent_hollow *hollow; /* NULL: none, and no flow */
} kent_member;

typedef struct kent_cluster_node {
    double c, y; /* m, m2/s: 7.13 */
    double head; /* m, the answer */
} kent_cluster_node;

typedef struct kent_cluster {
    kent_cluster_node *nodes;
    kent_member *members;
    size_t node_count, member_count;
    double *room; /* [kent_cluster_room(member_count)] to work in */
} kent_cluster;

/* Doubles that a search over so many members needs. */
size_t kent_cluster_room(size_t member_count);

/* From every node's c and y to flows and heads. False: no answer was found; then
 * *worst is the member whose law is furthest from holding, and *gap by how much (m). */
bool kent_cluster_solve(kent_cluster *c, size_t *worst, double *gap);

/* A member's law at a flow (m3/s) and the heads (m) of its sides. */
kent_device_law kent_member_law(const kent_member *member, double flow,
                                const double head[2]);

#endif
