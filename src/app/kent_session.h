/* Inside app/ only: what one command holds on to, and the steps that commands share. */
#ifndef KENT_SESSION_H
#define KENT_SESSION_H

#include "kent_options.h"
#include "kent_output.h"

typedef struct kent_session {
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
} kent_session;

void kent_session_close(kent_session *s); /* frees all that it holds */

void kent_session_say_error(const kent_error *err, kent_status status);

/* Says what went wrong, once; returns the exit status. */
kent_exit kent_session_fail(kent_session *s, kent_status status);

/* Each does one step, or says on standard error why it could not and returns another
 * status than KENT_EXIT_DONE. */
kent_exit kent_session_read_catalogue(kent_session *s);
kent_exit kent_session_read_case(kent_session *s);
kent_exit kent_session_choose_scenarios(kent_session *s);
kent_exit kent_session_do_job(kent_session *s);

/* The fittings named, in that order; [*count] indices, the caller's. Without names all
 * of the main. */
kent_exit kent_session_choose_fittings(kent_session *s, int **fittings, size_t *count);

kent_report_options kent_session_report_options(const kent_session *s);

/* Prints what one report wrote. */
kent_exit kent_session_print_report(kent_session *s, kent_status status,
                                    const kent_text *text);

/* ---- commands in files of their own ---------------------------------------------- */

kent_exit kent_command_as_built(kent_session *s);
kent_exit kent_command_standard_table(kent_session *s);

#endif
