/* What was reached, against what was asked: ratings, vapour, peaks too near the end. */
#ifndef KENT_LIMITS_H
#define KENT_LIMITS_H

#include "kent_job.h"

/* Adds cautions to r->cautions and sets r->limit_exceeded. */
void kent_limits_judge(kent_results *r);

#endif
