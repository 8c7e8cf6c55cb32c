/* Which load cases a main cannot be held without, and where it is tested below its
 * surge. */
#ifndef KENT_COMPLETENESS_H
#define KENT_COMPLETENESS_H

#include "kent_job.h"

/* Fills r->completeness from the loads and the marches, and says into r->cautions what
 * is missing and what was waived. Nothing is asked of fittings without a network. */
void kent_completeness_judge(kent_results *r);

/* Says where on the whole main a scenario goes highest above the site test there. */
void kent_completeness_test(kent_results *r);

#endif
