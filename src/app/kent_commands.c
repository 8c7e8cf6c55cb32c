#include "kent_commands.h"

#include "kent_session.h"

#include <stdio.h>
#include <stdlib.h>

/* ---- writing --------------------------------------------------------------------- */

static kent_status print_results(const kent_session *s, kent_text *text)
{
    const kent_report_options o = kent_session_report_options(s);
    const kent_sink sink = kent_output_gather(text);
    switch (s->options->format) {
    case KENT_TABLE_FORMAT:
        break;
    case KENT_CSV_FORMAT:
        if (s->results->sensitivity) {
            return kent_report_sensitivity_csv(s->results, sink);
        }
        return kent_report_summary_csv(s->results, &o, sink);
    case KENT_JSON_FORMAT:
        return kent_report_json(s->results, sink);
    }
    return kent_report_tables(s->results, &o, sink);
}

/* What the tables and results.json say of the whole case has no row in a CSV table. */
static void say_cautions(const kent_session *s)
{
    const kent_notes *cautions = &s->results->cautions;
    if (s->options->format != KENT_CSV_FORMAT || s->options->quiet) return;
    for (size_t i = 0; i < cautions->count; i++) {
        (void)fprintf(stderr, "caution: %s\n", cautions->text[i]);
    }
}

/* Before the work: a place that cannot take results is said at once, not after it. */
static kent_exit open_folder(kent_session *s)
{
    if (s->options->no_files) return KENT_EXIT_DONE;
    s->folder_name = s->options->out ? kent_copy_text(s->options->out)
                                     : kent_output_folder_name(s->options->subject);
    if (!s->folder_name) return kent_session_fail(s, kent_error_nomem(&s->error));
    const kent_status status =
        kent_folder_open(s->folder_name, KENT_OUTPUT_MARKER, &s->folder, &s->error);
    return status ? kent_session_fail(s, status) : KENT_EXIT_DONE;
}

/* The folder is filled beside its place, then the tables are printed, then the folder
 * is put in place: where printing fails, the old results still stand. */
static kent_exit write_results(kent_session *s)
{
    const kent_report_options o = kent_session_report_options(s);
    kent_text text = {0};
    kent_status status = KENT_OK;
    if (s->folder) status = kent_output_fill(s->results, &o, s->folder, &s->error);
    if (!status) status = print_results(s, &text);
    if (!status) status = kent_output_print(&text, &s->error);
    if (!status && s->folder) status = kent_folder_commit(s->folder, &s->error);
    kent_text_clear(&text);
    if (status) {
        kent_session_say_error(&s->error, status);
        return KENT_EXIT_FAILED;
    }
    say_cautions(s);
    if (s->folder && !s->options->quiet) {
        (void)fprintf(stderr, "results in %s\n", s->folder_name);
    }
    return KENT_EXIT_DONE;
}

/* ---- the commands ---------------------------------------------------------------- */

static kent_exit command_run(kent_session *s)
{
    kent_exit code = kent_session_read_case(s);
    if (!code) code = kent_session_choose_scenarios(s);
    if (!code) code = open_folder(s);
    if (!code) code = kent_session_do_job(s);
    if (!code) code = write_results(s);
    if (code || !s->options->strict) return code;
    if (s->results->limit_exceeded) {
        (void)fprintf(stderr,
                      "kentledge: --strict: a limit is exceeded (a rating, a lowest "
                      "pressure, the vapour limit, a thin pipe pressed from "
                      "outside, a fitting that nothing holds, or one built with "
                      "less than is asked)\n");
        return KENT_EXIT_LIMIT;
    }
    if (!s->results->incomplete) return code;
    (void)fprintf(stderr, "kentledge: --strict: not complete: a load case is missing, "
                          "and loads.waived does not say why\n");
    return KENT_EXIT_LIMIT;
}

static kent_exit command_keys(kent_session *s)
{
    kent_text text = {0};
    const kent_status status = kent_report_keys(kent_output_gather(&text));
    const kent_exit code = kent_session_print_report(s, status, &text);
    kent_text_clear(&text);
    return code;
}

/* What was understood is printed even where no steady state is found. */
static kent_exit command_check(kent_session *s)
{
    kent_steady **steadies = NULL;
    kent_text text = {0};
    kent_status solved = KENT_OK;
    kent_exit code = kent_session_read_case(s);
    if (code) return code;
    const kent_report_options o = kent_session_report_options(s);
    steadies = kent_alloc(s->model->state_count, sizeof(kent_steady *));
    if (!steadies) return kent_session_fail(s, kent_error_nomem(&s->error));
    if (s->model->span_count > 0) {
        solved = kent_steady_solve_states(s->model, steadies, &s->error);
    }
    const kent_status status =
        kent_report_check(s->model, steadies, &o, kent_output_gather(&text));
    if (solved) {
        (void)kent_output_print(&text, &s->error); /* the first cause stays */
        code = kent_session_fail(s, solved);
    } else {
        code = kent_session_print_report(s, status, &text);
    }
    kent_text_clear(&text);
    kent_steady_free_states(steadies, s->model->state_count);
    return code;
}

static kent_exit command_explain(kent_session *s)
{
    int *fittings = NULL;
    size_t count = 0;
    kent_text text = {0};
    kent_status status = KENT_OK;
    kent_exit code = kent_session_read_case(s);
    if (!code) code = kent_session_choose_fittings(s, &fittings, &count);
    if (!code) code = kent_session_choose_scenarios(s);
    if (!code) code = kent_session_do_job(s);
    if (code) goto done;
    const kent_report_options o = kent_session_report_options(s);
    const kent_sink sink = kent_output_gather(&text);
    for (size_t i = 0; i < count && !status; i++) {
        if (i > 0) kent_text_add(&text, "\n");
        status = kent_report_explain(s->results, fittings[i], &o, sink);
    }
    if (!status && s->options->word_count == 0) {
        status = kent_report_explain_along(s->results, &o, sink);
    }
    code = kent_session_print_report(s, status, &text);
done:
    kent_text_clear(&text);
    free(fittings);
    return code;
}

/* The job, and then the same marches by the second method. */
static kent_exit command_cross_check(kent_session *s)
{
    kent_opinion *opinions = NULL;
    kent_march *marches = NULL;
    kent_text text = {0};
    size_t count = 0;
    kent_exit code = kent_session_read_case(s);
    if (!code) code = kent_session_choose_scenarios(s);
    if (!code) code = kent_session_do_job(s);
    if (code) return code;
    const kent_results *r = s->results;
    const kent_report_options o = kent_session_report_options(s);
    opinions = kent_alloc(r->scenario_count, sizeof *opinions);
    marches = kent_alloc(r->scenario_count, sizeof *marches);
    if (!opinions || !marches) {
        code = kent_session_fail(s, kent_error_nomem(&s->error));
        goto done;
    }
    for (; count < r->scenario_count; count++) {
        marches[count] =
            (kent_march){r->scenarios[count].scenario, r->scenarios[count].state};
    }
    kent_status status =
        kent_crosscheck_run(s->model, r->steadies, marches, count,
                            kent_job_threads(s->options->threads), opinions, &s->error);
    if (!status) status = kent_report_cross(r, opinions, &o, kent_output_gather(&text));
    code = kent_session_print_report(s, status, &text);
    for (size_t i = 0; i < count && !code; i++) {
        if (opinions[i].stopped.what[0] == '\0') continue;
        s->error = opinions[i].stopped;
        code = kent_session_fail(s, KENT_E_SOLVE);
    }
done:
    for (size_t i = 0; i < count; i++) {
        kent_opinion_clear(&opinions[i]);
    }
    kent_text_clear(&text);
    free(opinions);
    free(marches);
    return code;
}

static kent_exit command_catalogue(kent_session *s)
{
    kent_text text = {0};
    kent_exit code = kent_session_read_catalogue(s);
    if (code) return code;
    const kent_report_options o = kent_session_report_options(s);
    const kent_choice choice = {s->options->subject, s->options->words,
                                s->options->word_count};
    size_t rows = 0;
    const kent_status status = kent_report_catalogue(s->catalogue, &choice, &o,
                                                     kent_output_gather(&text), &rows);
    code = kent_session_print_report(s, status, &text);
    if (!code && rows == 0 && choice.word_count > 0) {
        (void)fprintf(stderr, "kentledge: no row of %s has %s\n", choice.part,
                      choice.word_count > 1 ? "all of these words" : "this word");
        code = KENT_EXIT_FAILED;
    }
    kent_text_clear(&text);
    return code;
}

kent_exit kent_commands_do(const kent_options *o)
{
    kent_session s = {.options = o};
    kent_exit code = KENT_EXIT_FAILED;
    switch (o->command) {
    case KENT_RUN:
        code = command_run(&s);
        break;
    case KENT_CHECK:
        code = o->keys ? command_keys(&s) : command_check(&s);
        break;
    case KENT_EXPLAIN:
        code = command_explain(&s);
        break;
    case KENT_CROSS_CHECK:
        code = command_cross_check(&s);
        break;
    case KENT_AS_BUILT:
        code = kent_command_as_built(&s);
        break;
    case KENT_STANDARD_TABLE:
        code = kent_command_standard_table(&s);
        break;
    case KENT_CATALOGUE_LIST:
        code = command_catalogue(&s);
        break;
    }
    kent_session_close(&s);
    return code;
}
