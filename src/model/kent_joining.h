/* Fittings that become one: which ones, and the list of them made anew. Known to model/
 * alone.
 *
 *     kent_joining j = {0};
 *     if (kent_joining_start(&j, m, l) != KENT_OK) goto done;
 *     ... kent_joining_way(&j, f, port, ...), kent_joining_unite(&j, f, way.fitting)
 * ... status = kent_joining_finish(&j, merge, complaints); kent_joining_clear(&j);
 */
#ifndef KENT_JOINING_H
#define KENT_JOINING_H

#include "kent_model_internal.h"

typedef struct kent_joining {
    kent_model *m;
    const kent_layout *l;
    int *fitting_at; /* [point_count] -1: none there */
    int *root;   /* [fitting_count] the first of those that it is one with; itself */
    int *linked; /* [fitting_count] the same by legs between members alone */
    int *next;   /* [fitting_count] the next member after it; -1 */
    bool *inner; /* [port_count] leads to another member */
} kent_joining;

/* How a leg leads to the next fitting along it. */
typedef struct kent_way {
    int fitting;
    size_t port;     /* of that fitting, by which it comes in; into kent_model.ports */
    double distance; /* m, centre to centre */
    bool slips;      /* a joint on it can slip */
} kent_way;

kent_status kent_joining_start(kent_joining *j, kent_model *m, const kent_layout *l);
void kent_joining_clear(kent_joining *j);

/* Follows a fitting's leg (port into kent_model.ports) to the next fitting. False where
 * there is none before a tank, an end, or `diameters` outside diameters and `length` m.
 */
bool kent_joining_way(const kent_joining *j, int fitting, size_t port, double diameters,
                      double length, kent_way *out);

/* The first of those that a fitting is one with. */
int kent_joining_root(const kent_joining *j, int f);
/* Two become one, with all that they are one with already; the leg from f between them
 * is inner. */
void kent_joining_unite(kent_joining *j, int a, int b);
void kent_joining_inner(kent_joining *j, int f, size_t port, const kent_way *way);
/* The same for two members that pipe joins within the group. */
int kent_joining_link(const kent_joining *j, int f);

/* Replaces the first member of each by what merge makes of them and drops the others.
 * merge: the members are root, next[root] ...; it writes *out (members and ports apart)
 * and at most KENT_ARMS ports, and returns false with a complaint. */
typedef bool kent_merge(const kent_joining *j, int root, kent_fitting *out,
                        kent_port *ports, kent_complaints *complaints);
kent_status kent_joining_finish(kent_joining *j, kent_merge *merge,
                                kent_complaints *complaints);

#endif
