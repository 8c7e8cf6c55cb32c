/* Everything of base/. */
#ifndef KENT_BASE_H
#define KENT_BASE_H

#include "kent_alloc.h"
#include "kent_complaints.h"
#include "kent_error.h"
#include "kent_folder.h"
#include "kent_math.h"
#include "kent_notes.h"
#include "kent_queue.h"
#include "kent_status.h"
#include "kent_text.h"
#include "kent_vec3.h"

#endif
