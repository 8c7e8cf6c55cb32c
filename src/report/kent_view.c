#include "kent_view.h"

#include <math.h>

const kent_steady *kent_view_steady(const kent_view *v, size_t state)
{
    return v->steadies && state < v->model->state_count ? v->steadies[state] : NULL;
}

size_t kent_view_states(const kent_view *v)
{
    const size_t count = v->model->state_count;
    return v->wide || count < KENT_VIEW_STATES ? count : KENT_VIEW_STATES;
}

kent_shown kent_view_in_state(const kent_view *v, const char *what, size_t state)
{
    kent_shown s;
    const bool several = v->model->state_count > 1;
    (void)snprintf(s.text, sizeof s.text, "%s%s%s", what, several ? " " : "",
                   several ? v->model->states[state].id : "");
    return s;
}

bool kent_view_whole(const kent_view *v, size_t rows)
{
    return v->wide || rows <= KENT_VIEW_ROWS;
}

void kent_view_quantity(const kent_view *v, kent_table *t, kent_kind kind, double si)
{
    kent_table_cell(t, "%s", kent_shown_quantity(kind, v->units, si).text);
}

void kent_view_word(kent_table *t, const char *text)
{
    kent_table_cell(t, "%s", text[0] != '\0' ? text : KENT_SHOWN_NONE);
}

void kent_view_finish(const kent_view *v, const char *heading, kent_table *t)
{
    if (t->cell_count > 0 || t->failed) {
        kent_text_add(v->out, "\n%s\n", heading);
        if (kent_table_print(t, v->limit, v->out)) {
            kent_text_add(v->out, "%s\n", KENT_TABLE_CUT);
        }
    }
    kent_table_clear(t);
}

void kent_view_say(const kent_view *v, const char *lead, kent_text *words)
{
    kent_table_paragraph(v->out, v->limit, lead, kent_text_of(words));
    v->out->failed = v->out->failed || words->failed;
    kent_text_reset(words);
}

const char *kent_view_point(const kent_model *m, int point)
{
    return point >= 0 ? m->points[point].id : KENT_SHOWN_NONE;
}
