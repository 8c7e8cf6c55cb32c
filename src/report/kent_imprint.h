/* Inside report/ only: whose sheet it is, at its top; who judges it, what prevails over
 * it and where it is signed, at its end. What the case's project leaves out is left
 * out. */
#ifndef KENT_IMPRINT_H
#define KENT_IMPRINT_H

#include "kent_model.h"
#include "kent_text.h"

/* "for Some Water, project K-9, drawing C-201"; nothing where nothing is stated. */
void kent_imprint_words(const kent_project *p, kent_text *words);

/* limit: columns of a line; 0: none. */
void kent_imprint_top(const kent_model *m, size_t limit, kent_text *out);
void kent_imprint_end(const kent_model *m, size_t limit, kent_text *out);

#endif
