/* Inside report/ only: which fittings a table lists, and in which order. */
#ifndef KENT_LISTING_H
#define KENT_LISTING_H

#include "kent_report.h"

typedef struct kent_listing {
    size_t *fitting; /* [count] indices */
    size_t count;
} kent_listing;

/* refused_first: what cannot be held comes before the rest, where no order is asked
 * for. Of equal ones the model's order holds, along the routes. Returns KENT_OK or
 * KENT_E_NOMEM; clear it either way. */
kent_status kent_listing_make(const kent_results *r, const kent_report_options *o,
                              bool refused_first, kent_listing *out);
void kent_listing_clear(kent_listing *l);

#endif
