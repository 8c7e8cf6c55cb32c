#include "kent_session.h"

#include <stdio.h>
#include <stdlib.h>

static kent_status write_built(const kent_session *s, const int *fittings, size_t count,
                               kent_sink sink)
{
    const kent_report_options o = kent_session_report_options(s);
    switch (s->options->format) {
    case KENT_TABLE_FORMAT:
        break;
    case KENT_CSV_FORMAT:
        return kent_report_built_csv(s->results, fittings, count, &o, sink);
    case KENT_JSON_FORMAT:
        return kent_report_built_json(s->results, fittings, count, sink);
    }
    return kent_report_built(s->results, fittings, count, &o, sink);
}

/* How many of those fittings have less than is asked. */
static size_t short_of(const kent_results *r, const int *fittings, size_t count)
{
    size_t found = 0;
    for (size_t i = 0; i < count; i++) {
        const kent_as_built *b = &r->restraints->fittings[fittings[i]].as_built;
        found += b->stated && b->falls_short;
    }
    return found;
}

/* Without a FITTING, those alone that the case states as built. */
static size_t keep_stated(const kent_results *r, int *fittings, size_t count)
{
    size_t kept = 0;
    for (size_t i = 0; i < count; i++) {
        if (!r->restraints->fittings[fittings[i]].as_built.stated) continue;
        fittings[kept++] = fittings[i];
    }
    return kept;
}

kent_exit kent_command_as_built(kent_session *s)
{
    int *fittings = NULL;
    size_t count = 0;
    kent_text text = {0};
    kent_exit code = kent_session_read_case(s);
    if (code) return code;
    if (s->model->built_count == 0) {
        (void)fprintf(stderr,
                      "kentledge: the case states nothing as built; give it a list "
                      "as_built, with the fitting and the dimensions measured\n");
        return KENT_EXIT_INPUT;
    }
    code = kent_session_choose_fittings(s, &fittings, &count);
    if (!code) code = kent_session_choose_scenarios(s);
    if (!code) code = kent_session_do_job(s);
    if (code) goto done;
    if (s->options->word_count == 0) count = keep_stated(s->results, fittings, count);
    code = kent_session_print_report(
        s, write_built(s, fittings, count, kent_output_gather(&text)), &text);
    const size_t found = short_of(s->results, fittings, count);
    if (!code && s->options->strict && found > 0) {
        (void)fprintf(stderr,
                      "kentledge: --strict: %zu of the fittings built reach less than "
                      "is asked, or cannot be told\n",
                      found);
        code = KENT_EXIT_LIMIT;
    }
done:
    kent_text_clear(&text);
    free(fittings);
    return code;
}
