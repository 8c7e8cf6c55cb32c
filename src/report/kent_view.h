/* Inside report/ only: what the parts of one `check` share. Each part prints one
 * section, or nothing where there is nothing to say of it. */
#ifndef KENT_VIEW_H
#define KENT_VIEW_H

#include "kent_report.h"
#include "kent_shown.h"
#include "kent_table.h"

/* Rows of a list beyond which only counts and exceptions are printed, unless wide. */
enum { KENT_VIEW_ROWS = 200 };

/* States side by side in one table. */
enum { KENT_VIEW_STATES = 3 };

typedef struct kent_view {
    const kent_model *model;
    kent_steady *const *steadies; /* [state_count], NULL: not found; or NULL */
    kent_grid *grid;              /* NULL: no scenario, or it could not be planned */
    kent_system units;
    bool wide;
    size_t limit; /* columns of a line; 0: none */
    kent_text *out;
} kent_view;

/* The steady state found first; NULL: none. */
const kent_steady *kent_view_steady(const kent_view *v, size_t state);

/* States that stand side by side: at most KENT_VIEW_STATES. */
size_t kent_view_states(const kent_view *v);

/* "flow", or "flow low" where there are several states. */
kent_shown kent_view_in_state(const kent_view *v, const char *what, size_t state);

/* Whether a list of so many rows is printed whole. */
bool kent_view_whole(const kent_view *v, size_t rows);

/* One cell of a table. */
void kent_view_quantity(const kent_view *v, kent_table *t, kent_kind kind, double si);
void kent_view_word(kent_table *t, const char *text);

/* A heading, the table under it, and the table is let go. Nothing where it is empty. */
void kent_view_finish(const kent_view *v, const char *heading, kent_table *t);

/* A paragraph behind a lead; words is emptied. */
void kent_view_say(const kent_view *v, const char *lead, kent_text *words);

const char *kent_view_point(const kent_model *m, int point);

/* One device as the case has it: "air vessel VES1: 4.50 m3 of gas in 10.00 m3 ...". */
void kent_view_add_device(const kent_view *v, const kent_device *d, kent_text *out);

/* One soil's values and where they come from, a paragraph. */
void kent_view_soil(const kent_view *v, const kent_soil *s);

/* What is stated for the restraint of a fitting, each in a sentence after a blank. */
void kent_view_add_stated(const kent_view *v, const kent_fitting *f, kent_text *out);

/* ---- the parts ------------------------------------------------------------------- */

void kent_view_plan(const kent_view *v);   /* the main, point by point */
void kent_view_points(const kent_view *v); /* coordinates and heads */
void kent_view_pipes(const kent_view *v);  /* pipes, alike ones together */
void kent_view_spans(const kent_view *v);  /* steady flow and grid */
void kent_view_ground(const kent_view *v); /* ground, zones and soils */
void kent_view_loads(const kent_view *v);  /* test, still water, factors */
void kent_view_states_said(const kent_view *v);
void kent_view_scenarios(const kent_view *v);

#endif
