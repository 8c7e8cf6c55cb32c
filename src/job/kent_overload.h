/* Limits that were passed, in words: what pipes and fittings are rated for, what the
 * case asks for. */
#ifndef KENT_OVERLOAD_H
#define KENT_OVERLOAD_H

#include "kent_job.h"

/* Adds a caution to r->cautions for every limit passed that decides, with its place;
 * says of which pipes no rating is known. */
void kent_overload_judge(kent_results *r);

/* The highest pressure that a march reaches anywhere on the main; its point is the
 * nearest one of the route, -1: none was run. */
kent_worst kent_overload_of_marches(const kent_results *r);

#endif
