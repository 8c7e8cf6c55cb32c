/* Everything of casefile/. */
#ifndef KENT_CASEFILE_H
#define KENT_CASEFILE_H

#include "kent_case.h"
#include "kent_catalogue.h"
#include "kent_keys.h"
#include "kent_standard.h"
#include "kent_tree.h"

#endif
