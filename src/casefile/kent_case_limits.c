/* What the case asks of pressures beyond ratings. */
#include "kent_case_internal.h"

#include <math.h>

void kent_fill_limits(kent_filling *f)
{
    /* In the order of kent_class. */
    static const char *const LOWEST[] = {"lowest_recurring", "lowest_occasional",
                                         "lowest_exceptional"};
    kent_asked *a = &f->model->asked;
    kent_record r;
    if (!kent_fill_group(f, &f->root, "limits", &r)) return;
    a->lowest_steady = kent_record_number(&r, "lowest_steady");
    for (size_t i = 0; i < sizeof LOWEST / sizeof LOWEST[0]; i++) {
        a->lowest[i] = kent_record_number(&r, LOWEST[i]);
    }
    a->life = kent_record_number(&r, "life");
    if (r.sound && f->model->pipe_count == 0) {
        kent_record_complain(&f->reader, &r, NULL,
                             "what is asked here is of pipes, and the case has none; "
                             "give the fittings a rating instead");
    }
}
