#include "kent_session.h"

#include <stdio.h>

static kent_exit read_table(kent_session *s, kent_standard **out)
{
    const kent_options *o = s->options;
    const kent_exit failed = kent_session_read_catalogue(s);
    if (failed) return failed;
    const kent_status status =
        kent_standard_read(o->subject, s->catalogue, o->units_given ? &o->units : NULL,
                           out, &s->complaints, &s->error);
    if (!status) return KENT_EXIT_DONE;
    const kent_exit code = kent_session_fail(s, status);
    return status == KENT_E_IO ? KENT_EXIT_INPUT : code; /* no such file: bad usage */
}

static kent_status write_table(const kent_session *s, const kent_standard_result *r,
                               kent_sink sink)
{
    const kent_report_options o = {.units = r->cells[0].model->units,
                                   .wide = s->options->wide};
    switch (s->options->format) {
    case KENT_TABLE_FORMAT:
        break;
    case KENT_CSV_FORMAT:
        return kent_report_standard_csv(r, &o, sink);
    case KENT_JSON_FORMAT:
        return kent_report_standard_json(r, sink);
    }
    return kent_report_standard(r, &o, sink);
}

kent_exit kent_command_standard_table(kent_session *s)
{
    kent_standard *table = NULL;
    kent_standard_result *result = NULL;
    kent_text text = {0};
    kent_exit code = read_table(s, &table);
    if (code) return code;
    const kent_status status =
        kent_standard_work_out(table, s->options->threads, &result, &s->error);
    if (status) {
        code = kent_session_fail(s, status);
    } else {
        code = kent_session_print_report(
            s, write_table(s, result, kent_output_gather(&text)), &text);
    }
    if (!code && s->options->strict && result->not_sized > 0) {
        (void)fprintf(stderr,
                      "kentledge: --strict: %zu cells of the table lack what was asked "
                      "for\n",
                      result->not_sized);
        code = KENT_EXIT_LIMIT;
    }
    kent_text_clear(&text);
    kent_standard_result_free(result);
    kent_standard_free(table);
    return code;
}
