/* Results to text: tables, CSV, JSON, the hand calculation. Writes to a sink; opens no
 * files. Every function returns KENT_OK or KENT_E_NOMEM / KENT_E_IO. */
#ifndef KENT_REPORT_H
#define KENT_REPORT_H

#include "kent_catalogue.h"
#include "kent_crosscheck.h"
#include "kent_job.h"
#include "kent_standard_job.h"
#include <stdio.h>

typedef struct kent_sink {
    /* 0, or -1 where the text could not be taken */
    int (*write)(void *to, const char *text, size_t length);
    void *to;
} kent_sink;

/* A sink on an open stream. */
kent_sink kent_sink_stream(FILE *stream);

/* In which order fittings are listed. */
typedef enum kent_sort {
    KENT_SORT_USUAL,    /* along the routes; in tables what cannot be held first */
    KENT_SORT_STATION,  /* as counted along each route, whichever route it is */
    KENT_SORT_USE,      /* what cannot be held, then the most used of what resists */
    KENT_SORT_THRUST,   /* the largest factored thrust first */
    KENT_SORT_CONCRETE, /* the largest block first */
    KENT_SORTS
} kent_sort;

/* Which fittings are listed. */
typedef enum kent_only {
    KENT_ONLY_ALL,
    KENT_ONLY_NOT_HELD, /* that nothing here can hold */
    KENT_ONLY_BLOCKS,
    KENT_ONLY_JOINTS,
    KENT_ONLIES
} kent_only;

typedef struct kent_report_options {
    kent_system units;
    bool wide;
    kent_sort sort;
    kent_only only; /* figures in all stay those of every fitting */
} kent_report_options;

/* The two tables on standard output, at most 100 columns wide unless wide. */
kent_status kent_report_tables(const kent_results *r, const kent_report_options *o,
                               kent_sink sink);
kent_status kent_report_summary_csv(const kent_results *r, const kent_report_options *o,
                                    kent_sink sink);
kent_status kent_report_json(const kent_results *r, kent_sink sink);
kent_status kent_report_history_csv(const kent_results *r, size_t scenario,
                                    kent_sink sink);
kent_status kent_report_profile_csv(const kent_results *r, size_t scenario,
                                    kent_sink sink);

/* A row per fitting and variation, SI; r->sensitivity must be there. */
kent_status kent_report_sensitivity_csv(const kent_results *r, kent_sink sink);

/* `check`: what was understood. steadies: [state_count] of each state, NULL where none
 * was found; NULL: of no state. */
kent_status kent_report_check(const kent_model *m, kent_steady *const *steadies,
                              const kent_report_options *o, kent_sink sink);

/* `check --keys`: the key table, as the tables of docs/case-format.md. */
kent_status kent_report_keys(kent_sink sink);

/* `explain`: one fitting's numbers as a hand calculation. */
kent_status kent_report_explain(const kent_results *r, int fitting,
                                const kent_report_options *o, kent_sink sink);

/* `explain`, of the whole case: string ends and steep stretches at no fitting. */
kent_status kent_report_explain_along(const kent_results *r,
                                      const kent_report_options *o, kent_sink sink);

/* `cross-check`: the peaks of r and of a second opinion on each of its scenarios
 * ([scenario_count]) side by side. */
kent_status kent_report_cross(const kent_results *r, const kent_opinion *opinions,
                              const kent_report_options *o, kent_sink sink);

/* `as-built`: what was built of the fittings named ([count] indices) and the factor it
 * reaches in every load case; a row per part and case; or both as JSON. */
kent_status kent_report_built(const kent_results *r, const int *fittings, size_t count,
                              const kent_report_options *o, kent_sink sink);
kent_status kent_report_built_csv(const kent_results *r, const int *fittings,
                                  size_t count, const kent_report_options *o,
                                  kent_sink sink);
kent_status kent_report_built_json(const kent_results *r, const int *fittings,
                                   size_t count, kent_sink sink);

/* `standard-table`: every assumption, then a table for each soil; a row per cell; or
 * both as JSON. */
kent_status kent_report_standard(const kent_standard_result *r,
                                 const kent_report_options *o, kent_sink sink);
kent_status kent_report_standard_csv(const kent_standard_result *r,
                                     const kent_report_options *o, kent_sink sink);
kent_status kent_report_standard_json(const kent_standard_result *r, kent_sink sink);

/* Which rows of the catalogue: part is NULL for all or "pipes", "soils", "valves",
 * "rules", "materials", "pumps"; every word must occur, in any case of letters, in a
 * row's id, material, standard, source or status. */
typedef struct kent_choice {
    const char *part;
    const char *const *words; /* [word_count] */
    size_t word_count;
} kent_choice;

/* `catalogue`; *rows: how many were listed. A part without any is left out. */
kent_status kent_report_catalogue(const kent_catalogue *c, const kent_choice *choice,
                                  const kent_report_options *o, kent_sink sink,
                                  size_t *rows);

#endif
