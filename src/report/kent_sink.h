/* Inside report/ only: from growing text into a sink. */
#ifndef KENT_SINK_H
#define KENT_SINK_H

#include "kent_report.h"

/* Hands the text over and empties it. KENT_E_NOMEM where part of it was lost on the
 * way, KENT_E_IO where the sink does not take it. */
kent_status kent_sink_flush(kent_sink sink, kent_text *text);

#endif
