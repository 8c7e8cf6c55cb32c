/* Systems of restrained lengths on their way from legs to stretches. */
#ifndef KENT_SYSTEM_INTERNAL_H
#define KENT_SYSTEM_INTERNAL_H

#include "kent_leg_internal.h"

#include <stdint.h>

/* One leg with restrained joints, or the run of a tee. */
typedef struct kent_system_leg {
    size_t system;
    size_t fitting, leg; /* leg: of the holding; SIZE_MAX: a tee's run */
    kent_along way;      /* where it begins */
    kent_leg_walk walk;
    size_t toward; /* fitting of the system that stands next on its way; SIZE_MAX */
    double away;   /* m to that, or to where the system ends */
} kent_system_leg;

typedef struct kent_system_work { /* borrowed but for legs, runs and roots */
    const kent_model *m;
    const kent_standings *standings;
    kent_restraints *r;
    kent_system_leg *legs; /* [leg_count] by system, fitting, leg */
    size_t leg_count, leg_capacity;
    size_t *roots; /* [fitting_count] */
} kent_system_work;

/* Legs of one system, from first on; count of them. */
size_t kent_system_legs(const kent_system_work *w, size_t first);

/* Lengthens the legs that lead out of systems whose whole turn, or whose end, asks for
 * more than their own fitting does. Returns whether any got longer. */
bool kent_system_lengthen(kent_system_work *w);

/* What each system comes to, and what is said of it. Returns false for want of memory.
 */
bool kent_system_tell(kent_system_work *w);

/* Systems of all fittings of r that restrained joints hold, in whole or in part. */
kent_status kent_systems_find(const kent_model *m, const kent_standings *standings,
                              kent_restraints *r, kent_error *err);
void kent_systems_clear(kent_systems *s);

#endif
