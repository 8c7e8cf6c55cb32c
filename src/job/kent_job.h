/* One whole job in memory: model to results. No files, no printing. */
#ifndef KENT_JOB_H
#define KENT_JOB_H

#include "kent_restraint.h"
#include "kent_steady.h"

typedef struct kent_peak {           /* of one point in one march */
    double highest_head, highest_at; /* m, s */
    double lowest_head, lowest_at;
} kent_peak;

typedef struct kent_swing {     /* of one quantity of a device; NAN: never told */
    double highest, highest_at; /* SI, s */
    double lowest, lowest_at;
} kent_swing;

typedef struct kent_device_extreme { /* of one device in one march */
    kent_swing flow;                 /* m3/s, as kent_device says */
    kent_swing told[KENT_TOLD];      /* as kent_device_quantities names them */
    const char *caution; /* of kent_marcher_caution, and as long-lived as the program */
} kent_device_extreme;

typedef struct kent_history { /* every watched place of a march, thinned */
    size_t rows, watch_count, device_count;
    double *time;             /* [rows] s */
    double *head, *flow;      /* [rows][watch_count] m, m3/s */
    kent_device_row *devices; /* [rows][device_count] */
} kent_history;

typedef struct kent_scenario_result { /* of one march */
    int scenario, state;
    double step; /* s */
    size_t steps;
    double uncertainty; /* m: whole difference between the two grids; NAN: one grid */
    kent_grid *grid;    /* as marched */
    kent_peak *points;  /* [point_count]; NAN for a point on no span */
    kent_device_extreme *devices; /* [device_count] */
    double **highest, **lowest;   /* [span_count][reaches + 1] m */
    kent_history history;         /* columns: kent_results.history_points */
    size_t below_vapour; /* grid points whose head fell below the vapour limit */
    bool *touched;       /* [point_count] points at or next to one */
    kent_cavity
        *cavities; /* [cavity_count] every place where one opened, largest first */
    size_t cavity_count;
    double *hollow; /* [point_count] m3: the largest at the point, or at a grid point on
                       either side of it; 0: none */
} kent_scenario_result;

/* What a pressure is held against. */
typedef enum kent_limit_kind {
    KENT_LIMIT_PIPE,     /* the pipe's rating */
    KENT_LIMIT_JOINT,    /* that of its joints */
    KENT_LIMIT_FITTING,  /* that of a fitting's own parts */
    KENT_LIMIT_LOWEST,   /* the lowest pressure that the case asks for */
    KENT_LIMIT_VAPOUR,   /* at which water boils */
    KENT_LIMIT_COLLAPSE, /* outer less inner pressure at which a thin pipe buckles */
    KENT_LIMIT_KINDS
} kent_limit_kind;

/* One case on one pipe or fitting: what it reached, where and when, and what is asked.
 */
typedef struct kent_limit {
    kent_limit_kind kind;
    kent_name when;     /* "static", "steady (low)", "test", a scenario's ... */
    int state;          /* of steady flow; -1 */
    int march;          /* index into results' scenarios; -1 */
    int pipe, note;     /* one of the two; -1: the other: an index of the model's */
    int span;           /* of a pipe; -1 */
    int point;          /* -1: between points, or a fitting without a network */
    double chainage;    /* m from the pipe's start; NAN */
    double time;        /* s; NAN: outside marches, and between points */
    double reached;     /* Pa gauge; of a collapse outer less inner; NAN: not known */
    double asked;       /* Pa; NAN: nobody asks, or no rating is known */
    kent_rating rating; /* that is asked, of pipes and fittings */
    bool exceeded;
    bool for_comparison; /* it decides nothing */
} kent_limit;

/* What a design comes to at one fitting, in few numbers. */
typedef struct kent_gauge {
    double highest, lowest; /* Pa gauge, of all marches that decide; NAN: none */
    bool held;              /* needing nothing counts */
    kent_block_type type;
    double area;         /* m2 that a bearing block is asked for; NAN: none */
    double volume;       /* m3 of concrete, a face of its own included; NAN: none */
    double length;       /* m restrained; NAN: none */
    kent_name governing; /* its load case, as printed; empty: none */
} kent_gauge;

enum { KENT_LESS, KENT_MORE, KENT_WAYS };

/* How a design moves with what nobody knows well: each run against one like it with
 * nothing moved, all on the coarser grid. */
typedef struct kent_sensitivity {
    size_t fitting_count;
    kent_gauge *base; /* [fitting_count] */
    kent_gauge
        *varied[KENT_VARIES][KENT_WAYS]; /* [fitting_count]; NULL: it tells nothing
                                            here, and was not run; or it stopped: */
    kent_error stopped[KENT_VARIES][KENT_WAYS]; /* a march that could not go on */
} kent_sensitivity;

/* Load cases that a main is not held without, unless it is said why. */
typedef enum kent_needed_case {
    KENT_NEEDS_TEST,
    KENT_NEEDS_STATIC,
    KENT_NEEDS_SHUT_OFF, /* where there are pumps */
    KENT_NEEDS_SURGE,
    KENT_NEEDED_CASES
} kent_needed_case;

typedef struct kent_needed {
    const char *what;   /* "test" ... */
    bool asked;         /* false: it means nothing here */
    bool present;       /* among the load cases of this run */
    const char *waived; /* the case's reason to do without; NULL */
} kent_needed;

typedef struct kent_results {
    const kent_model *model; /* the caller's; must outlive the results */
    kent_steady **steadies;  /* [steady_count], by state */
    size_t steady_count;
    kent_scenario_result *scenarios; /* [scenario_count] marches of those asked for, in
                                        the order asked, by state */
    size_t scenario_count;
    int *history_points; /* [history_count] points whose history is kept */
    size_t history_count;
    kent_loads_result *loads;
    kent_restraints *restraints;
    kent_limit *limits; /* [limit_count] by case, then by kind, then pipe or fitting */
    size_t limit_count;
    kent_needed completeness[KENT_NEEDED_CASES];
    bool incomplete;     /* something asked is neither present nor waived */
    kent_notes cautions; /* of the case and the runs */
    bool limit_exceeded; /* one of limits, for a scenario that decides, or a fitting
                            nothing can hold: --strict */
    kent_sensitivity *sensitivity; /* NULL: not asked for */
} kent_results;

typedef struct kent_job_options {
    const int *scenarios; /* [scenario_count] to run, each once, from all its states;
                             NULL: all */
    size_t scenario_count;
    unsigned threads; /* 0: as many as there are processors */
    bool one_grid;    /* no grid check, whatever the case says */
} kent_job_options;

/* What to start where so many were asked for: that many, or, of 0, one for each
 * processor. */
unsigned kent_job_threads(unsigned asked);

kent_status kent_job_run(const kent_model *m, const kent_job_options *options,
                         kent_results **out, kent_error *err);
void kent_results_free(kent_results *r);

/* The job again with everything moved that kent_vary names, less and more, one run at a
 * time, of the same scenarios. A variation whose march stops says so in its place; all
 * else that fails, fails. */
kent_status kent_sensitivity_run(const kent_model *m, const kent_job_options *options,
                                 kent_sensitivity **out, kent_error *err);
void kent_sensitivity_free(kent_sensitivity *s);

#endif
