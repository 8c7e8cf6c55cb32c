#include "kent_session.h"

#include "kent_case.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

void kent_session_close(kent_session *s)
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

void kent_session_say_error(const kent_error *err, kent_status status)
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
kent_exit kent_session_fail(kent_session *s, kent_status status)
{
    if (s->complaints.count > 0) {
        say_complaints(&s->complaints);
        return KENT_EXIT_INPUT;
    }
    kent_session_say_error(&s->error, status);
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

kent_exit kent_session_read_catalogue(kent_session *s)
{
    const kent_status status =
        kent_catalogue_read(NULL, &s->catalogue, &s->complaints, &s->error);
    if (!status) return KENT_EXIT_DONE;
    const kent_exit failed = kent_session_fail(s, status);
    if (status != KENT_E_IO) return failed;
    (void)fprintf(stderr, "kentledge: that is a file of the catalogue; its folder is "
                          "named by KENTLEDGE_CONFIG\n");
    return KENT_EXIT_INPUT; /* it is not where told */
}

kent_exit kent_session_read_case(kent_session *s)
{
    const kent_exit failed = kent_session_read_catalogue(s);
    if (failed) return failed;
    const kent_options *o = s->options;
    const kent_status status =
        kent_case_read(o->subject, s->catalogue, o->units_given ? &o->units : NULL,
                       &s->model, &s->complaints, &s->error);
    if (!status) return KENT_EXIT_DONE;
    const kent_exit code = kent_session_fail(s, status);
    return status == KENT_E_IO ? KENT_EXIT_INPUT : code; /* no such file: bad usage */
}

static int find_name(const char *name, const char *const *names, size_t count)
{
    for (size_t i = 0; i < count; i++) {
        if (strcmp(name, names[i]) == 0) return (int)i;
    }
    return -1;
}

static bool chosen_already(const kent_session *s, int scenario)
{
    for (size_t i = 0; i < s->scenario_count; i++) {
        if (s->scenarios[i] == scenario) return true;
    }
    return false;
}

/* The scenarios asked for, each once, as indices. */
kent_exit kent_session_choose_scenarios(kent_session *s)
{
    const kent_options *o = s->options;
    const size_t count = s->model->scenario_count;
    kent_exit code = KENT_EXIT_DONE;
    const char **names = kent_alloc(count, sizeof *names);
    s->scenarios = kent_alloc(o->scenario_count, sizeof *s->scenarios);
    if (!names || !s->scenarios) {
        code = kent_session_fail(s, kent_error_nomem(&s->error));
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
static kent_exit find_fitting(const kent_session *s, const char *name, int *fitting)
{
    const kent_model *m = s->model;
    *fitting = kent_model_fitting_of(m, name);
    if (*fitting >= 0) return KENT_EXIT_DONE;
    const char **names = kent_alloc(m->fitting_count, sizeof *names);
    if (!names) {
        kent_session_say_error(&s->error, KENT_E_NOMEM);
        return KENT_EXIT_FAILED;
    }
    for (size_t i = 0; i < m->fitting_count; i++) {
        names[i] = m->fittings[i].id;
    }
    say_unknown("fitting", name, names, m->fitting_count);
    free(names);
    return KENT_EXIT_INPUT;
}

kent_report_options kent_session_report_options(const kent_session *s)
{
    const kent_options *o = s->options; /* units: SI unless given, of a catalogue */
    return (kent_report_options){.units = s->model ? s->model->units : o->units,
                                 .wide = o->wide,
                                 .sort = o->sort,
                                 .only = o->only};
}

kent_exit kent_session_do_job(kent_session *s)
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
    return status ? kent_session_fail(s, status) : KENT_EXIT_DONE;
}

kent_exit kent_session_choose_fittings(kent_session *s, int **fittings, size_t *count)
{
    const kent_options *o = s->options;
    kent_exit code = KENT_EXIT_DONE;
    *count = o->word_count > 0 ? o->word_count : s->model->fitting_count;
    *fittings = kent_alloc(*count, sizeof **fittings);
    if (!*fittings) return kent_session_fail(s, kent_error_nomem(&s->error));
    for (size_t i = 0; i < *count; i++) {
        (*fittings)[i] = (int)i;
        if (o->word_count == 0) continue;
        const kent_exit found = find_fitting(s, o->words[i], &(*fittings)[i]);
        if (!code) code = found;
    }
    return code;
}

kent_exit kent_session_print_report(kent_session *s, kent_status status,
                                    const kent_text *text)
{
    if (!status) status = kent_output_print(text, &s->error);
    return status ? kent_session_fail(s, status) : KENT_EXIT_DONE;
}
