#include "kent_second.h"

#include "kent_dae_internal.h"

#include <ida/ida.h>
#include <nvector/nvector_serial.h>
#include <sunlinsol/sunlinsol_klu.h>
#include <sunmatrix/sunmatrix_sparse.h>

#include <assert.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* Of one step, in metres of head or what is as much: 17.14. */
static const double TOLERANCE = 1e-3;
static const double RELATIVE = 1e-9;
/* Longest step over the time in which a wave crosses a cell of the main. */
static const double LONGEST_STEP = 2.0;
/* 1/s, in place of 1/step where cells must stand still. */
static const double STANDSTILL = 1e12;
/* Steps times unknowns of a run: some 0.1 us each. */
static const double WORK_MOST = 5e9;
/* Share of the tolerance within which heads fit after a change. */
static const double SETTLED = 1e-3;
enum {
    CORRECTIONS_WHOLE = 20, /* of heads after a change; then by halves, ... */
    CORRECTIONS_MOST = 80,  /* to this many */
    SWITCHES_MOST = 20000
};

/* Where the head of a point is read: nodes there, or a place on a span. */
typedef struct look {
    int span; /* -1: on no pipe */
    double chainage;
} look;

typedef struct run {
    const kent_model *model;
    kent_dae *dae;
    double duration; /* s */
    SUNContext context;
    void *ida;
    SUNMatrix matrix, matrix_at_once; /* IDA's; for what changes at once */
    SUNLinearSolver solver, solver_at_once;
    N_Vector y, rate, tolerance, changing, work;
    look *looks; /* [point_count] */
    kent_second_peak *extremes;
    kent_second_report *report;
    char said[160]; /* by IDA, of what went wrong */
} run;

/* ---- what IDA calls -------------------------------------------------------------- */

/* 1: beyond any number there, try a shorter step. */
static int call_residual(realtype time, N_Vector y, N_Vector rate, N_Vector f,
                         void *data)
{
    const run *r = data;
    const double *value = N_VGetArrayPointer(f);
    double sum = 0.0;
    kent_dae_residual(r->dae, time, N_VGetArrayPointer(y), N_VGetArrayPointer(rate),
                      N_VGetArrayPointer(f));
    for (size_t i = 0; i < r->dae->size; i++) {
        sum += fabs(value[i]);
    }
    return isfinite(sum) ? 0 : 1;
}

/* NOLINTNEXTLINE(readability-function-size): IDA says what it takes */
static int call_derivatives(realtype time, realtype c, N_Vector y, N_Vector rate,
                            N_Vector f, SUNMatrix j, void *data, N_Vector work1,
                            N_Vector work2, N_Vector work3)
{
    const run *r = data;
    const kent_dae *d = r->dae;
    sunindextype *row = SUNSparseMatrix_IndexPointers(j);
    sunindextype *column = SUNSparseMatrix_IndexValues(j);
    (void)rate;
    (void)f;
    (void)work1;
    (void)work2;
    (void)work3;
    /* IDA wipes the pattern before every call */
    for (size_t i = 0; i <= d->size; i++) {
        row[i] = (sunindextype)d->row[i];
    }
    for (int64_t k = 0; k < d->row[d->size]; k++) {
        column[k] = (sunindextype)d->column[k];
    }
    kent_dae_derivatives(d, time, N_VGetArrayPointer(y), c, SUNSparseMatrix_Data(j));
    return 0;
}

static int call_roots(realtype time, N_Vector y, N_Vector rate, realtype *root,
                      void *data)
{
    const run *r = data;
    double u[KENT_PASSAGE_UNKNOWNS];
    (void)rate;
    for (size_t i = 0; i < r->dae->links->count; i++) {
        const kent_passage *l = &r->dae->links->link[i];
        if (l->ops->roots == 0) continue;
        kent_dae_gather(r->dae, l, N_VGetArrayPointer(y), u);
        l->ops->watch(l, time, u, root + l->root_first);
    }
    return 0;
}

/* A library never prints: what went wrong is kept for the caller. */
static void call_error(int code, const char *module, const char *function,
                       char *message, void *data)
{
    run *r = data;
    (void)code;
    (void)module;
    (void)function;
    (void)snprintf(r->said, sizeof r->said, "%s", message);
}

/* ---- life ------------------------------------------------------------------------ */

static void run_clear(run *r)
{
    if (r->ida) IDAFree(&r->ida);
    if (r->solver) SUNLinSolFree(r->solver);
    if (r->solver_at_once) SUNLinSolFree(r->solver_at_once);
    if (r->matrix) SUNMatDestroy(r->matrix);
    if (r->matrix_at_once) SUNMatDestroy(r->matrix_at_once);
    N_Vector vectors[] = {r->y, r->rate, r->tolerance, r->changing, r->work};
    for (size_t i = 0; i < sizeof vectors / sizeof vectors[0]; i++) {
        if (vectors[i]) N_VDestroy(vectors[i]);
    }
    if (r->context) (void)SUNContext_Free(&r->context);
    kent_dae_free(r->dae);
    free(r->looks);
}

static bool make_parts(run *r)
{
    const sunindextype n = (sunindextype)r->dae->size;
    const sunindextype entries = (sunindextype)r->dae->row[r->dae->size];
    if (SUNContext_Create(NULL, &r->context) != 0) return false;
    r->y = N_VNew_Serial(n, r->context);
    r->rate = N_VNew_Serial(n, r->context);
    r->tolerance = N_VNew_Serial(n, r->context);
    r->changing = N_VNew_Serial(n, r->context);
    r->work = N_VNew_Serial(n, r->context);
    r->matrix = SUNSparseMatrix(n, n, entries, CSR_MAT, r->context);
    r->matrix_at_once = SUNSparseMatrix(n, n, entries, CSR_MAT, r->context);
    if (!r->y || !r->rate || !r->tolerance || !r->changing || !r->work || !r->matrix ||
        !r->matrix_at_once) {
        return false;
    }
    r->solver = SUNLinSol_KLU(r->y, r->matrix, r->context);
    r->solver_at_once = SUNLinSol_KLU(r->y, r->matrix_at_once, r->context);
    r->ida = IDACreate(r->context);
    if (!r->solver || !r->solver_at_once || !r->ida) return false;
    /* Pivots that were good may be nil after a change of mode. Then KLU must go on, so
     * that the wrapper sees the condition and chooses pivots anew. */
    SUNLinSol_KLUGetCommon(r->solver)->halt_if_singular = 0;
    SUNLinSol_KLUGetCommon(r->solver_at_once)->halt_if_singular = 0;
    return true;
}

/* s: what a wave needs to cross a cell, of the shortest such time among cells that are
 * not shorter than others only because their span is. */
static double crossing_time(const kent_dae *d)
{
    double longest = 0.0;
    for (size_t i = 0; i < d->model->span_count; i++) {
        longest = fmax(longest, 1.0 / d->reach[i].per_cell);
    }
    return longest;
}

static bool join_parts(run *r)
{
    void *k = r->ida;
    kent_dae_scales(r->dae, N_VGetArrayPointer(r->tolerance),
                    N_VGetArrayPointer(r->changing));
    N_VScale(TOLERANCE, r->tolerance, r->tolerance);
    N_VConst(0.0, r->rate);
    return IDASetErrHandlerFn(k, call_error, r) == IDA_SUCCESS &&
           IDAInit(k, call_residual, 0.0, r->y, r->rate) == IDA_SUCCESS &&
           IDASetUserData(k, r) == IDA_SUCCESS &&
           IDASVtolerances(k, RELATIVE, r->tolerance) == IDA_SUCCESS &&
           IDASetId(k, r->changing) == IDA_SUCCESS &&
           IDASetSuppressAlg(k, SUNTRUE) == IDA_SUCCESS &&
           IDASetLinearSolver(k, r->solver, r->matrix) == IDA_SUCCESS &&
           IDASetJacFn(k, call_derivatives) == IDA_SUCCESS &&
           IDASetMaxStep(k, LONGEST_STEP * crossing_time(r->dae)) == IDA_SUCCESS &&
           IDARootInit(k, (int)r->dae->links->roots, call_roots) == IDA_SUCCESS;
}

/* ---- where points are ------------------------------------------------------------ */

static void find_looks(run *r)
{
    const kent_model *m = r->model;
    for (size_t p = 0; p < m->point_count; p++) {
        r->looks[p].span = -1;
        r->extremes[p] = (kent_second_peak){NAN, NAN, NAN, NAN};
    }
    for (size_t i = 0; i < m->span_count; i++) {
        const size_t first = m->spans[i].route_first;
        for (size_t k = first; k < first + m->spans[i].route_count; k++) {
            look *l = &r->looks[m->route[k]];
            if (l->span >= 0) continue;
            *l = (look){(int)i, m->chainage[k] - m->chainage[first]};
        }
    }
}

static void take_head(run *r, int point, double time, double head)
{
    kent_second_peak *e = &r->extremes[point];
    if (!(head <= e->highest)) { /* the first one too */
        e->highest = head;
        e->highest_at = time;
    }
    if (!(head >= e->lowest)) {
        e->lowest = head;
        e->lowest_at = time;
    }
}

/* Highest and lowest heads so far, at nodes and between them. */
static void take_heads(run *r, double time)
{
    const kent_model *m = r->model;
    const double *y = N_VGetArrayPointer(r->y);
    for (size_t n = 0; n < m->node_count; n++) {
        if (m->nodes[n].end_count == 0) continue;
        take_head(r, m->nodes[n].point, time, y[r->dae->nodes + n]);
    }
    for (size_t p = 0; p < m->point_count; p++) {
        const look *l = &r->looks[p];
        if (l->span < 0) continue;
        const double length = m->spans[l->span].length;
        if (l->chainage <= 0.0 || l->chainage >= length) continue; /* a node */
        take_head(r, (int)p, time, kent_dae_head(r->dae, y, l->span, l->chainage));
    }
}

static void judge_vapour(run *r)
{
    const kent_model *m = r->model;
    for (size_t p = 0; p < m->point_count; p++) {
        const double limit =
            kent_vapour_head(&m->water, m->points[p].at.z, m->barometric, m->gravity);
        if (r->extremes[p].lowest < limit) r->report->below_vapour = true;
    }
}

/* ---- going on -------------------------------------------------------------------- */

/* "at pipe A, 312 m along", where an unknown belongs. */
static void name_unknown(const run *r, size_t i, char *out, size_t size)
{
    const kent_model *m = r->model;
    const kent_dae *d = r->dae;
    for (size_t s = 0; i < d->nodes && s < m->span_count; s++) {
        const kent_strand *strand = &d->reach[s].strand[0];
        if (i >= strand->first + 2 * strand->count) continue;
        const size_t whole = (i - strand->first) / 2;
        const double cell = (double)whole + 0.5;
        (void)snprintf(out, size, "%.0f m along %s",
                       cell / (double)strand->count * m->spans[s].length,
                       m->spans[s].id);
        return;
    }
    if (i >= d->nodes && i < d->nodes + m->node_count) {
        (void)snprintf(out, size, "at point %s",
                       m->points[m->nodes[i - d->nodes].point].id);
        return;
    }
    for (size_t k = 0; k < d->links->count; k++) {
        const kent_passage *l = &d->links->link[k];
        if (i >= l->at && i <= l->at + l->ops->states) {
            (void)snprintf(out, size, "at %s", l->id);
            return;
        }
    }
}

/* The unknown whose error of the last step is the largest against its tolerance. */
static size_t find_worst(run *r)
{
    size_t worst = 0;
    double most = -1.0;
    if (IDAGetEstLocalErrors(r->ida, r->work) != IDA_SUCCESS) return 0;
    const double *error = N_VGetArrayPointer(r->work);
    const double *tolerance = N_VGetArrayPointer(r->tolerance);
    for (size_t i = 0; i < r->dae->size; i++) {
        const double share = fabs(error[i]) / tolerance[i];
        if (!(share > most)) continue;
        most = share;
        worst = i;
    }
    return worst;
}

static kent_status tell_stop(run *r, int flag, double time, kent_error *err)
{
    char where[KENT_ID + 32] = "";
    if (flag == IDA_MEM_NULL || flag == IDA_MEM_FAIL) return kent_error_nomem(err);
    name_unknown(r, find_worst(r), where, sizeof where);
    return kent_error_set(err, KENT_E_SOLVE, "",
                          "the second method stopped at %.4g s, most in doubt %s "
                          "(IDA %d: %s)",
                          time, where, flag, r->said);
}

/* One step of Newton's method on heads and flows alone: cells and states stand still,
 * as if the step were nil. Writes how much of its tolerance the furthest moved. */
static bool correct_heads(run *r, double time, double share, double *most)
{
    const kent_dae *d = r->dae;
    double *y = N_VGetArrayPointer(r->y), *f = N_VGetArrayPointer(r->rate);
    double *step = N_VGetArrayPointer(r->work);
    const double *changing = N_VGetArrayPointer(r->changing);
    const double *tolerance = N_VGetArrayPointer(r->tolerance);

    N_VConst(0.0, r->work);
    kent_dae_residual(d, time, y, step, f);
    for (size_t i = 0; i < d->size; i++) {
        if (changing[i] > 0.0) f[i] = 0.0;
    }
    (void)call_derivatives(time, STANDSTILL, r->y, NULL, NULL, r->matrix_at_once, r,
                           NULL, NULL, NULL);
    if (SUNLinSolSetup(r->solver_at_once, r->matrix_at_once) != 0) return false;
    if (SUNLinSolSolve(r->solver_at_once, r->matrix_at_once, r->work, r->rate, 0.0)) {
        return false;
    }
    *most = 0.0;
    for (size_t i = 0; i < d->size; i++) {
        if (changing[i] > 0.0) continue;
        y[i] -= share * step[i];
        *most = fmax(*most, fabs(step[i]) / tolerance[i]);
        if (!isfinite(y[i])) return false;
    }
    return true;
}

/* Lets links know that no time passes while heads are sought, or that they are found.
 */
static void settle_links(const run *r, bool settling)
{
    double *y = N_VGetArrayPointer(r->y);
    for (size_t i = 0; i < r->dae->links->count; i++) {
        kent_passage *l = &r->dae->links->link[i];
        if (!settling && l->ops->settle) {
            double u[KENT_PASSAGE_UNKNOWNS];
            kent_dae_gather(r->dae, l, y, u);
            l->ops->settle(l, u);
            memcpy(&y[l->at + 1], &u[KENT_AT_STATE], l->ops->states * sizeof *u);
        }
        l->settling = settling;
    }
}

/* Heads and flows that fit the equations after something has changed at once, and the
 * rates of the rest: 17.15. */
static bool make_consistent(run *r, double time)
{
    const double *changing = N_VGetArrayPointer(r->changing);
    double *rate = N_VGetArrayPointer(r->rate), *f = N_VGetArrayPointer(r->work);
    double most = INFINITY;

    settle_links(r, true);
    for (int i = 0; most > SETTLED; i++) {
        const double share =
            i < CORRECTIONS_WHOLE ? 1.0 : 0.5; /* it may go to and fro */
        if (i == CORRECTIONS_MOST) return false;
        if (!correct_heads(r, time, share, &most)) return false;
    }
    settle_links(r, false);
    N_VConst(0.0, r->rate);
    kent_dae_residual(r->dae, time, N_VGetArrayPointer(r->y), rate, f);
    for (size_t i = 0; i < r->dae->size; i++) {
        rate[i] = changing[i] > 0.0 ? -f[i] : 0.0;
    }
    return IDAReInit(r->ida, time, r->y, r->rate) == IDA_SUCCESS;
}

/* Lets every link do what is due; when something next is, s. */
static double move_links(run *r, double time)
{
    double next = r->duration;
    double *y = N_VGetArrayPointer(r->y);
    for (size_t i = 0; i < r->dae->links->count; i++) {
        kent_passage *l = &r->dae->links->link[i];
        kent_timetable_move(&l->timetable, time);
        if (l->ops->due && l->alarm <= time) {
            double u[KENT_PASSAGE_UNKNOWNS];
            l->alarm = INFINITY;
            kent_dae_gather(r->dae, l, y, u);
            l->ops->due(l, time, u);
            memcpy(&y[l->at + 1], &u[KENT_AT_STATE], l->ops->states * sizeof *u);
        }
        if (l->timetable.count > 0) {
            next = fmin(next, kent_timetable_next(&l->timetable));
        }
        next = fmin(next, l->alarm);
    }
    return next;
}

static kent_status cross_roots(run *r, double time, kent_error *err)
{
    double *y = N_VGetArrayPointer(r->y);
    int *met = kent_alloc(r->dae->links->roots, sizeof *met);
    if (!met) return kent_error_nomem(err);
    if (IDAGetRootInfo(r->ida, met) != IDA_SUCCESS) {
        free(met);
        return kent_error_nomem(err);
    }
    for (size_t i = 0; i < r->dae->links->count; i++) {
        kent_passage *l = &r->dae->links->link[i];
        for (size_t k = 0; k < l->ops->roots; k++) {
            double u[KENT_PASSAGE_UNKNOWNS];
            if (met[l->root_first + k] == 0) continue;
            kent_dae_gather(r->dae, l, y, u);
            l->ops->cross(l, time, u, k, met[l->root_first + k] > 0);
            memcpy(&y[l->at + 1], &u[KENT_AT_STATE], l->ops->states * sizeof *u);
            r->report->switches++;
        }
    }
    free(met);
    return KENT_OK;
}

/* From one change to the next: `until` s. Where a root is met it ends there. */
static kent_status integrate(run *r, double *time, double until, bool *root,
                             kent_error *err)
{
    int flag = IDASetStopTime(r->ida, until);
    *root = false;
    while (flag >= 0 && flag != IDA_TSTOP_RETURN && !*root) {
        realtype now = *time;
        flag = IDASolve(r->ida, until, &now, r->y, r->rate, IDA_ONE_STEP);
        *time = now;
        if (flag < 0) break;
        take_heads(r, now);
        *root = flag == IDA_ROOT_RETURN;
        r->report->steps++;
        if ((double)r->report->steps * (double)r->dae->size > WORK_MOST) {
            (void)snprintf(r->said, sizeof r->said, "too many steps");
            return tell_stop(r, flag, now, err);
        }
    }
    return flag < 0 ? tell_stop(r, flag, *time, err) : KENT_OK;
}

static kent_status go_through(run *r, kent_error *err)
{
    double time = 0.0; /* s */
    take_heads(r, time);
    while (time < r->duration) {
        bool root = false;
        const double until = move_links(r, time);
        if (!make_consistent(r, time)) {
            (void)snprintf(r->said, sizeof r->said,
                           "no heads were found that fit what has changed");
            return tell_stop(r, 0, time, err);
        }
        take_heads(r, time);
        kent_status status = integrate(r, &time, until, &root, err);
        if (!status && root) status = cross_roots(r, time, err);
        if (status) return status;
        if (!root) time = until; /* to the bit, for what is due then */
        if (r->report->switches > SWITCHES_MOST) {
            (void)snprintf(r->said, sizeof r->said, "a device kept switching");
            return tell_stop(r, 0, time, err);
        }
    }
    return KENT_OK;
}

kent_status kent_second_solve(const kent_model *m, const kent_steady *s, int scenario,
                              double duration, const kent_mesh *mesh,
                              kent_second_peak *extremes, kent_second_report *report,
                              kent_error *err)
{
    const double whole = scenario < 0 ? duration : m->scenarios[scenario].duration;
    run r = {.model = m, .duration = whole, .extremes = extremes, .report = report};
    *report = (kent_second_report){0};
    kent_status status = kent_dae_new(m, s, scenario, mesh, &r.dae, err);
    if (status) goto done;
    r.looks = kent_alloc(m->point_count, sizeof *r.looks);
    if (!r.looks || !make_parts(&r)) {
        status = kent_error_nomem(err);
        goto done;
    }
    report->cells = r.dae->cells;
    kent_dae_start(r.dae, s, N_VGetArrayPointer(r.y));
    find_looks(&r);
    status = join_parts(&r) ? go_through(&r, err) : kent_error_nomem(err);
    if (!status) judge_vapour(&r);
done:
    run_clear(&r);
    return status;
}
