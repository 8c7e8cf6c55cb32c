/* A case file to a model. */
#ifndef KENT_CASE_H
#define KENT_CASE_H

#include "kent_catalogue.h"
#include "kent_model.h"

/* Reads the case at path ("-": standard input) with the catalogue, validates it against
 * the key table, and derives the model. shown: the system of units that everything said
 * of the case uses; NULL: the one that it names. KENT_E_INPUT: complaints say
 * everything that is wrong, with file and line. KENT_E_IO and KENT_E_NOMEM: err. *out
 * is the caller's. */
kent_status kent_case_read(const char *path, const kent_catalogue *catalogue,
                           const kent_system *shown, kent_model **out,
                           kent_complaints *complaints, kent_error *err);

#endif
