#include "kent_commands.h"

#include "kent_case.h"
#include "kent_output.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* Everything one command holds on to. */
typedef struct session {
    const kent_options *options;
    kent_catalogue *catalogue;
    kent_model *model;
    int *scenarios; /* [options->scenario_count] */
    size_t scenario_count;
    char *folder_name;
    kent_folder *folder; /* NULL: no files are written */
    kent_results *results;
    kent_error error;
    kent_complaints complaints;
} session;

static void session_close(session *s)
{
    kent_folder_free(s->folder);
    free(s->folder_name);
    kent_results_free(s->results);
    free(s->scenarios);
    kent_model_free(s->model);
    kent_catalogue_free(s->catalogue);
}

/* ---- standard error -------------------------------------------------------------- */

static kent_exit exit_of(kent_status status)
{
    switch (status) {
    case KENT_OK:
        return KENT_EXIT_DONE;
    case KENT_E_INPUT:
        return KENT_EXIT_INPUT;
    case KENT_E_NOMEM:
    case KENT_E_SOLVE:
    case KENT_E_IO:
        break;
    }
    return KENT_EXIT_FAILED;
}

static void say_error(const kent_error *err, kent_status status)
{
    const char *where = err->where[0] != '\0' ? err->where : "kentledge";
    const char *what = err->what[0] != '\0' ? err->what : kent_status_text(status);
    (void)fprintf(stderr, "%s: %s\n", where, what);
}

static void say_complaints(kent_complaints *c)
{
    const size_t kept =
        c->count < KENT_COMPLAINTS_KEPT ? c->count : (size_t)KENT_COMPLAINTS_KEPT;
    kent_complaints_sort(c);
    for (size_t i = 0; i < kept; i++) {
        const kent_complaint *k = &c->kept[i];
        if (k->line > 0) {
            (void)fprintf(stderr, "%s:%d: %s\n", k->file, k->line, k->what);
        } else {
            (void)fprintf(stderr, "%s: %s\n", k->file, k->what);
        }
    }
    (void)fprintf(stderr, "%zu error%s", c->count, c->count == 1 ? "" : "s");
    if (c->count > kept) (void)fprintf(stderr, ", the first %zu shown", kept);
    (void)fprintf(stderr, "; nothing was run\n");
}

/* Says what went wrong, once; returns the exit status. */
static kent_exit fail(session *s, kent_status status)
{
    if (s->complaints.count > 0) {
        say_complaints(&s->complaints);
        return KENT_EXIT_INPUT;
    }
    say_error(&s->error, status);
    return exit_of(status);
}

/* "did you mean 'shut-12s'?" or the names there are. */
static void say_unknown(const char *kind, const char *given, const char *const *names,
                        size_t count)
{
    enum { NAMED = 12 };
    const char *near = kent_options_nearest(given, names, count);
    (void)fprintf(stderr, "kentledge: the case has no %s '%s'", kind, given);
    if (near) {
        (void)fprintf(stderr, "; did you mean '%s'?\n", near);
        return;
    }
    for (size_t i = 0; i < count && i < NAMED; i++) {
        (void)fprintf(stderr, "%s%s", i > 0 ? ", " : "; it has ", names[i]);
    }
    (void)fprintf(stderr, "%s\n", count > NAMED ? " and others" : "");
}

/* ---- reading --------------------------------------------------------------------- */

static kent_exit read_catalogue(session *s)
{
    const kent_status status =
        kent_catalogue_read(NULL, &s->catalogue, &s->complaints, &s->error);
    if (!status) return KENT_EXIT_DONE;
    const kent_exit failed = fail(s, status);
    if (status != KENT_E_IO) return failed;
    (void)fprintf(stderr, "kentledge: that is a file of the catalogue; its folder is "
                          "named by KENTLEDGE_CONFIG\n");
    return KENT_EXIT_INPUT; /* it is not where told */
}

static kent_exit read_case(session *s)
{
    const kent_exit failed = read_catalogue(s);
    if (failed) return failed;
    const kent_options *o = s->options;
    const kent_status status =
        kent_case_read(o->subject, s->catalogue, o->units_given ? &o->units : NULL,
                       &s->model, &s->complaints, &s->error);
    if (!status) return KENT_EXIT_DONE;
    const kent_exit code = fail(s, status);
    return status == KENT_E_IO ? KENT_EXIT_INPUT : code; /* no such file: bad usage */
}

static int find_name(const char *name, const char *const *names, size_t count)
{
    for (size_t i = 0; i < count; i++) {
        if (strcmp(name, names[i]) == 0) return (int)i;
    }
    return -1;
}

static bool chosen_already(const session *s, int scenario)
{
    for (size_t i = 0; i < s->scenario_count; i++) {
        if (s->scenarios[i] == scenario) return true;
    }
    return false;
}

/* The scenarios asked for, each once, as indices. */
static kent_exit choose_scenarios(session *s)
{
    const kent_options *o = s->options;
    const size_t count = s->model->scenario_count;
    kent_exit code = KENT_EXIT_DONE;
    const char **names = kent_alloc(count, sizeof *names);
    s->scenarios = kent_alloc(o->scenario_count, sizeof *s->scenarios);
    if (!names || !s->scenarios) {
        code = fail(s, kent_error_nomem(&s->error));
        goto done;
    }
    for (size_t i = 0; i < count; i++) {
        names[i] = s->model->scenarios[i].id;
    }
    for (size_t i = 0; i < o->scenario_count; i++) {
        const int found = find_name(o->scenarios[i], names, count);
        if (found < 0) {
            say_unknown("scenario", o->scenarios[i], names, count);
            code = KENT_EXIT_INPUT;
        } else if (!chosen_already(s, found)) {
            s->scenarios[s->scenario_count++] = found;
        }
    }
done:
    free(names);
    return code;
}

/* By its own id, or by that of a point whose fitting is held as one with it. */
static kent_exit find_fitting(const session *s, const char *name, int *fitting)
{
    const kent_model *m = s->model;
    *fitting = kent_model_fitting_of(m, name);
    if (*fitting >= 0) return KENT_EXIT_DONE;
    const char **names = kent_alloc(m->fitting_count, sizeof *names);
    if (!names) {
        say_error(&s->error, KENT_E_NOMEM);
        return KENT_EXIT_FAILED;
    }
    for (size_t i = 0; i < m->fitting_count; i++) {
        names[i] = m->fittings[i].id;
    }
    say_unknown("fitting", name, names, m->fitting_count);
    free(names);
    return KENT_EXIT_INPUT;
}

static kent_report_options report_options(const session *s)
{
    const kent_options *o = s->options; /* units: SI unless given, of a catalogue */
    return (kent_report_options){.units = s->model ? s->model->units : o->units,
                                 .wide = o->wide,
                                 .sort = o->sort,
                                 .only = o->only};
}

static kent_exit do_job(session *s)
{
    const kent_job_options job = {
        .scenarios = s->options->scenario_count > 0 ? s->scenarios : NULL,
        .scenario_count = s->scenario_count,
        .threads = s->options->threads,
    };
    kent_status status = kent_job_run(s->model, &job, &s->results, &s->error);
    if (!status && s->options->sensitivity) {
        status =
            kent_sensitivity_run(s->model, &job, &s->results->sensitivity, &s->error);
    }
    return status ? fail(s, status) : KENT_EXIT_DONE;
}

/* ---- writing --------------------------------------------------------------------- */

static kent_status print_results(const session *s, kent_text *text)
{
    const kent_report_options o = report_options(s);
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
static void say_cautions(const session *s)
{
    const kent_notes *cautions = &s->results->cautions;
    if (s->options->format != KENT_CSV_FORMAT || s->options->quiet) return;
    for (size_t i = 0; i < cautions->count; i++) {
        (void)fprintf(stderr, "caution: %s\n", cautions->text[i]);
    }
}

/* Before the work: a place that cannot take results is said at once, not after it. */
static kent_exit open_folder(session *s)
{
    if (s->options->no_files) return KENT_EXIT_DONE;
    s->folder_name = s->options->out ? kent_copy_text(s->options->out)
                                     : kent_output_folder_name(s->options->subject);
    if (!s->folder_name) return fail(s, kent_error_nomem(&s->error));
    const kent_status status =
        kent_folder_open(s->folder_name, KENT_OUTPUT_MARKER, &s->folder, &s->error);
    return status ? fail(s, status) : KENT_EXIT_DONE;
}

/* The folder is filled beside its place, then the tables are printed, then the folder
 * is put in place: where printing fails, the old results still stand. */
static kent_exit write_results(session *s)
{
    const kent_report_options o = report_options(s);
    kent_text text = {0};
    kent_status status = KENT_OK;
    if (s->folder) status = kent_output_fill(s->results, &o, s->folder, &s->error);
    if (!status) status = print_results(s, &text);
    if (!status) status = kent_output_print(&text, &s->error);
    if (!status && s->folder) status = kent_folder_commit(s->folder, &s->error);
    kent_text_clear(&text);
    if (status) {
        say_error(&s->error, status);
        return KENT_EXIT_FAILED;
    }
    say_cautions(s);
    if (s->folder && !s->options->quiet) {
        (void)fprintf(stderr, "results in %s\n", s->folder_name);
    }
    return KENT_EXIT_DONE;
}

/* ---- the commands ---------------------------------------------------------------- */

static kent_exit command_run(session *s)
{
    kent_exit code = read_case(s);
    if (!code) code = choose_scenarios(s);
    if (!code) code = open_folder(s);
    if (!code) code = do_job(s);
    if (!code) code = write_results(s);
    if (code || !s->options->strict || !s->results->limit_exceeded) return code;
    (void)fprintf(stderr,
                  "kentledge: --strict: a limit is exceeded (a rating, a lowest "
                  "pressure, the vapour limit, a thin pipe pressed from "
                  "outside, or a fitting that nothing holds)\n");
    return KENT_EXIT_LIMIT;
}

/* Prints what one report wrote. */
static kent_exit print_report(session *s, kent_status status, const kent_text *text)
{
    if (!status) status = kent_output_print(text, &s->error);
    return status ? fail(s, status) : KENT_EXIT_DONE;
}

static kent_exit command_keys(session *s)
{
    kent_text text = {0};
    const kent_status status = kent_report_keys(kent_output_gather(&text));
    const kent_exit code = print_report(s, status, &text);
    kent_text_clear(&text);
    return code;
}

/* What was understood is printed even where no steady state is found. */
static kent_exit command_check(session *s)
{
    kent_steady **steadies = NULL;
    kent_text text = {0};
    kent_status solved = KENT_OK;
    kent_exit code = read_case(s);
    if (code) return code;
    const kent_report_options o = report_options(s);
    steadies = kent_alloc(s->model->state_count, sizeof(kent_steady *));
    if (!steadies) return fail(s, kent_error_nomem(&s->error));
    if (s->model->span_count > 0) {
        solved = kent_steady_solve_states(s->model, steadies, &s->error);
    }
    const kent_status status =
        kent_report_check(s->model, steadies, &o, kent_output_gather(&text));
    if (solved) {
        (void)kent_output_print(&text, &s->error); /* the first cause stays */
        code = fail(s, solved);
    } else {
        code = print_report(s, status, &text);
    }
    kent_text_clear(&text);
    kent_steady_free_states(steadies, s->model->state_count);
    return code;
}

/* The fittings named, in that order; [*count] indices, the caller's. Without names all
 * of the main. */
static kent_exit choose_fittings(session *s, int **fittings, size_t *count)
{
    const kent_options *o = s->options;
    kent_exit code = KENT_EXIT_DONE;
    *count = o->word_count > 0 ? o->word_count : s->model->fitting_count;
    *fittings = kent_alloc(*count, sizeof **fittings);
    if (!*fittings) return fail(s, kent_error_nomem(&s->error));
    for (size_t i = 0; i < *count; i++) {
        (*fittings)[i] = (int)i;
        if (o->word_count == 0) continue;
        const kent_exit found = find_fitting(s, o->words[i], &(*fittings)[i]);
        if (!code) code = found;
    }
    return code;
}

static kent_exit command_explain(session *s)
{
    int *fittings = NULL;
    size_t count = 0;
    kent_text text = {0};
    kent_status status = KENT_OK;
    kent_exit code = read_case(s);
    if (!code) code = choose_fittings(s, &fittings, &count);
    if (!code) code = choose_scenarios(s);
    if (!code) code = do_job(s);
    if (code) goto done;
    const kent_report_options o = report_options(s);
    const kent_sink sink = kent_output_gather(&text);
    for (size_t i = 0; i < count && !status; i++) {
        if (i > 0) kent_text_add(&text, "\n");
        status = kent_report_explain(s->results, fittings[i], &o, sink);
    }
    code = print_report(s, status, &text);
done:
    kent_text_clear(&text);
    free(fittings);
    return code;
}

/* The job, and then the same marches by the second method. */
static kent_exit command_cross_check(session *s)
{
    kent_opinion *opinions = NULL;
    kent_march *marches = NULL;
    kent_text text = {0};
    size_t count = 0;
    kent_exit code = read_case(s);
    if (!code) code = choose_scenarios(s);
    if (!code) code = do_job(s);
    if (code) return code;
    const kent_results *r = s->results;
    const kent_report_options o = report_options(s);
    opinions = kent_alloc(r->scenario_count, sizeof *opinions);
    marches = kent_alloc(r->scenario_count, sizeof *marches);
    if (!opinions || !marches) {
        code = fail(s, kent_error_nomem(&s->error));
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
    code = print_report(s, status, &text);
    for (size_t i = 0; i < count && !code; i++) {
        if (opinions[i].stopped.what[0] == '\0') continue;
        s->error = opinions[i].stopped;
        code = fail(s, KENT_E_SOLVE);
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

static kent_exit command_catalogue(session *s)
{
    kent_text text = {0};
    kent_exit code = read_catalogue(s);
    if (code) return code;
    const kent_report_options o = report_options(s);
    const kent_choice choice = {s->options->subject, s->options->words,
                                s->options->word_count};
    size_t rows = 0;
    const kent_status status = kent_report_catalogue(s->catalogue, &choice, &o,
                                                     kent_output_gather(&text), &rows);
    code = print_report(s, status, &text);
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
    session s = {.options = o};
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
    case KENT_CATALOGUE_LIST:
        code = command_catalogue(&s);
        break;
    }
    session_close(&s);
    return code;
}
