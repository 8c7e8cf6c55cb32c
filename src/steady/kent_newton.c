#include "kent_newton_internal.h"
#include "kent_elimination_internal.h"

#include <kinsol/kinsol.h>
#include <nvector/nvector_serial.h>
#include <sunmatrix/sunmatrix_sparse.h>

#include <math.h>
#include <stdlib.h>
#include <string.h>

enum {
    SEARCH_LIMIT = 50, /* iterations of KINSOL */
    POLISH_LIMIT = 60, /* plain Newton steps after it */
    PATIENCE = 3,      /* steps without gain before polishing ends */
    PATIENCE_LOST = 30 /* the same where KINSOL gave up */
};

/* KINSOL's own tolerances, in units of the scales: it need only come near, polishing
 * does the rest. */
static const double SEARCH_TOLERANCE = 1e-8;
static const double SEARCH_LEAST_STEP = 1e-13;
static const double SEARCH_LONGEST_STEP = 1e12; /* none: the line search shortens */

/* What counts as solved, and where rounding makes further steps pointless: per metre of
 * head and per m3/s of flow_scale. */
static const double SOLVED_HEAD = 1e-12, SOLVED_FLOW = 1e-13;
static const double ROUNDING = 1e-16;

struct kent_newton {
    const kent_equations *eq;
    kent_elimination *elimination;
    SUNContext context;
    void *kinsol;
    SUNLinearSolver solver;
    SUNMatrix matrix;
    N_Vector x, x_scale, f_scale;
    double *f, *value, *step, *best; /* [size], [row[size]], [size], [size] */
    kent_status failed; /* of the linear solver; KENT_OK: it did not fail */
};

/* ---- what KINSOL calls ----------------------------------------------------------- */

/* 1: beyond any number there, try nearer by. KINSOL's line search does not end on NaN.
 */
static int call_residual(N_Vector x, N_Vector f, void *data)
{
    const kent_newton *nw = data;
    const double *value = N_VGetArrayPointer(f);
    double sum = 0.0;

    kent_equations_residual(nw->eq, N_VGetArrayPointer(x), N_VGetArrayPointer(f));
    for (size_t i = 0; i < nw->eq->size; i++) {
        sum += fabs(value[i]);
    }
    return isfinite(sum * sum) ? 0 : 1;
}

static int call_derivatives(N_Vector x, N_Vector f, SUNMatrix j, void *data,
                            N_Vector work1, N_Vector work2)
{
    const kent_newton *nw = data;
    const kent_equations *eq = nw->eq;
    sunindextype *row = SUNSparseMatrix_IndexPointers(j);
    sunindextype *column = SUNSparseMatrix_IndexValues(j);

    (void)f;
    (void)work1;
    (void)work2;
    /* KINSOL wipes the pattern before every call */
    for (size_t i = 0; i <= eq->size; i++) {
        row[i] = (sunindextype)eq->row[i];
    }
    for (int64_t k = 0; k < eq->row[eq->size]; k++) {
        column[k] = (sunindextype)eq->column[k];
    }
    kent_equations_derivatives(eq, N_VGetArrayPointer(x), SUNSparseMatrix_Data(j));
    return 0;
}

static SUNLinearSolver_Type call_type(SUNLinearSolver s)
{
    (void)s;
    return SUNLINEARSOLVER_DIRECT;
}

static int call_initialize(SUNLinearSolver s)
{
    (void)s;
    return SUNLS_SUCCESS;
}

static int call_setup(SUNLinearSolver s, SUNMatrix j)
{
    kent_newton *nw = s->content;
    nw->failed = kent_elimination_factor(nw->elimination, SUNSparseMatrix_Data(j));
    return nw->failed == KENT_OK ? SUNLS_SUCCESS : SUNLS_PACKAGE_FAIL_UNREC;
}

static int call_solve(SUNLinearSolver s, SUNMatrix j, N_Vector x, N_Vector b,
                      realtype tolerance)
{
    kent_newton *nw = s->content;
    (void)j;
    (void)tolerance;
    nw->failed = kent_elimination_solve(nw->elimination, N_VGetArrayPointer(b),
                                        N_VGetArrayPointer(x));
    return nw->failed == KENT_OK ? SUNLS_SUCCESS : SUNLS_PACKAGE_FAIL_UNREC;
}

/* A library never prints: what went wrong is told by the caller. */
static void call_error(int code, const char *module, const char *function,
                       char *message, void *data)
{
    (void)code;
    (void)module;
    (void)function;
    (void)message;
    (void)data;
}

/* ---- life ------------------------------------------------------------------------ */

void kent_newton_free(kent_newton *nw)
{
    if (!nw) return;
    if (nw->kinsol) KINFree(&nw->kinsol);
    if (nw->solver) SUNLinSolFreeEmpty(nw->solver);
    if (nw->matrix) SUNMatDestroy(nw->matrix);
    if (nw->x) N_VDestroy(nw->x);
    if (nw->x_scale) N_VDestroy(nw->x_scale);
    if (nw->f_scale) N_VDestroy(nw->f_scale);
    if (nw->context) (void)SUNContext_Free(&nw->context);
    kent_elimination_free(nw->elimination);
    free(nw->f);
    free(nw->value);
    free(nw->step);
    free(nw->best);
    free(nw);
}

static bool make_parts(kent_newton *nw)
{
    const size_t size = nw->eq->size;
    const sunindextype n = (sunindextype)size;
    const sunindextype entries = (sunindextype)nw->eq->row[size];

    nw->f = kent_alloc(size, sizeof *nw->f);
    nw->value = kent_alloc((size_t)entries, sizeof *nw->value);
    nw->step = kent_alloc(size, sizeof *nw->step);
    nw->best = kent_alloc(size, sizeof *nw->best);
    if (!nw->f || !nw->value || !nw->step || !nw->best) return false;
    if (kent_elimination_new(nw->eq, &nw->elimination) != KENT_OK) return false;
    if (SUNContext_Create(NULL, &nw->context) != 0) return false;
    nw->x = N_VNew_Serial(n, nw->context);
    nw->x_scale = N_VNew_Serial(n, nw->context);
    nw->f_scale = N_VNew_Serial(n, nw->context);
    nw->matrix = SUNSparseMatrix(n, n, entries, CSR_MAT, nw->context);
    nw->solver = SUNLinSolNewEmpty(nw->context);
    nw->kinsol = KINCreate(nw->context);
    return nw->x && nw->x_scale && nw->f_scale && nw->matrix && nw->solver &&
           nw->kinsol;
}

static bool join_parts(kent_newton *nw)
{
    nw->solver->content = nw;
    nw->solver->ops->gettype = call_type;
    nw->solver->ops->initialize = call_initialize;
    nw->solver->ops->setup = call_setup;
    nw->solver->ops->solve = call_solve;
    void *k = nw->kinsol;
    return KINSetErrHandlerFn(k, call_error, NULL) == KIN_SUCCESS &&
           KINInit(k, call_residual, nw->x) == KIN_SUCCESS &&
           KINSetUserData(k, nw) == KIN_SUCCESS &&
           KINSetLinearSolver(k, nw->solver, nw->matrix) == KIN_SUCCESS &&
           KINSetJacFn(k, call_derivatives) == KIN_SUCCESS &&
           KINSetMaxSetupCalls(k, 1) == KIN_SUCCESS &&
           KINSetNumMaxIters(k, SEARCH_LIMIT) == KIN_SUCCESS &&
           KINSetFuncNormTol(k, SEARCH_TOLERANCE) == KIN_SUCCESS &&
           KINSetScaledStepTol(k, SEARCH_LEAST_STEP) == KIN_SUCCESS &&
           KINSetMaxNewtonStep(k, SEARCH_LONGEST_STEP) == KIN_SUCCESS;
}

kent_status kent_newton_new(const kent_equations *eq, kent_newton **out,
                            kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    kent_newton *nw = kent_alloc(1, sizeof *nw);

    if (!nw) goto done;
    nw->eq = eq;
    if (!make_parts(nw) || !join_parts(nw)) goto done;
    *out = nw;
    nw = NULL; /* handed over */
    status = KENT_OK;
done:
    kent_newton_free(nw);
    return status == KENT_OK ? KENT_OK : kent_error_nomem(err);
}

/* ---- solving --------------------------------------------------------------------- */

/* Unknowns: 1 m and 1 m/s in the largest span; equations the same. Link laws change
 * from solve to solve, and with them what their equations measure. */
static void set_scales(kent_newton *nw)
{
    const kent_equations *eq = nw->eq;
    double *of_x = N_VGetArrayPointer(nw->x_scale);
    double *of_f = N_VGetArrayPointer(nw->f_scale);
    const double of_flow = 1.0 / eq->flow_scale;

    for (size_t i = 0; i < eq->size; i++) {
        of_x[i] = i < eq->nodes ? 1.0 : of_flow;
        of_f[i] = kent_equations_is_flow(eq, i) ? of_flow : 1.0;
    }
}

/* Writes the worst equations of f into end; false: f is not finite. */
static bool find_worst(const kent_equations *eq, const double *f, kent_newton_end *end)
{
    bool finite = true;
    end->imbalance = end->head_gap = 0.0;
    end->imbalance_at = end->head_gap_at = eq->size;
    for (size_t i = 0; i < eq->size; i++) {
        const bool flow = kent_equations_is_flow(eq, i);
        double *worst = flow ? &end->imbalance : &end->head_gap;
        size_t *at = flow ? &end->imbalance_at : &end->head_gap_at;
        finite = finite && isfinite(f[i]);
        if (*at < eq->size && !(fabs(f[i]) > fabs(*worst))) continue;
        *worst = f[i];
        *at = i;
    }
    return finite;
}

/* m, the head whose rounding is the floor of every head equation. */
static double head_scale(const kent_equations *eq, const double *x)
{
    double largest = 1.0;
    for (size_t n = 0; n < eq->nodes; n++) {
        largest = fmax(largest, fabs(x[n]));
    }
    return largest;
}

/* How far from solved, 1: just solved. */
static double distance(const kent_equations *eq, const double *x,
                       const kent_newton_end *end)
{
    return fmax(fabs(end->head_gap) / (SOLVED_HEAD * head_scale(eq, x)),
                fabs(end->imbalance) / (SOLVED_FLOW * eq->flow_scale));
}

static kent_status newton_step(kent_newton *nw, double *x)
{
    const kent_equations *eq = nw->eq;
    kent_equations_derivatives(eq, x, nw->value);
    nw->failed = kent_elimination_factor(nw->elimination, nw->value);
    if (nw->failed != KENT_OK) return nw->failed;
    nw->failed = kent_elimination_solve(nw->elimination, nw->f, nw->step);
    if (nw->failed != KENT_OK) return nw->failed;
    for (size_t i = 0; i < eq->size; i++) {
        x[i] -= nw->step[i];
    }
    return KENT_OK;
}

/* Newton steps of full length until rounding stops them; x: the best of them. */
static void polish(kent_newton *nw, double *x, int patience, kent_newton_end *end)
{
    const kent_equations *eq = nw->eq;
    const size_t bytes = eq->size * sizeof *x;
    double best = INFINITY;
    int idle = 0;
    kent_newton_end now = *end;

    for (int i = 0; i <= POLISH_LIMIT; i++) {
        kent_equations_residual(eq, x, nw->f);
        const bool finite = find_worst(eq, nw->f, &now);
        const double away = distance(eq, x, &now);
        idle = away < 0.5 * best ? 0 : idle + 1;
        if (finite && away < best) {
            best = away;
            *end = now;
            memcpy(nw->best, x, bytes);
        }
        if (!finite || best <= ROUNDING / SOLVED_HEAD || idle >= patience) break;
        if (newton_step(nw, x) != KENT_OK) break;
        now.iterations++;
    }
    if (isfinite(best)) memcpy(x, nw->best, bytes);
    end->iterations = now.iterations;
    if (best <= 1.0) end->stop = KENT_STOP_CONVERGED;
}

static kent_stop search_stop(const kent_newton *nw, int flag)
{
    if (nw->failed != KENT_OK) return KENT_STOP_SINGULAR;
    return flag == KIN_MAXITER_REACHED ? KENT_STOP_LIMIT : KENT_STOP_STALLED;
}

kent_status kent_newton_solve(kent_newton *nw, double *x, kent_newton_end *end,
                              kent_error *err)
{
    const size_t bytes = nw->eq->size * sizeof *x;
    long iterations = 0;

    nw->failed = KENT_OK;
    set_scales(nw);
    memcpy(N_VGetArrayPointer(nw->x), x, bytes);
    const int flag =
        KINSol(nw->kinsol, nw->x, KIN_LINESEARCH, nw->x_scale, nw->f_scale);
    if (flag == KIN_MEM_FAIL || nw->failed == KENT_E_NOMEM) {
        return kent_error_nomem(err);
    }
    (void)KINGetNumNonlinSolvIters(nw->kinsol, &iterations);
    *end =
        (kent_newton_end){.stop = search_stop(nw, flag), .iterations = (int)iterations};
    memcpy(x, N_VGetArrayPointer(nw->x), bytes);
    polish(nw, x, flag >= 0 ? PATIENCE : PATIENCE_LOST, end);
    return nw->failed == KENT_E_NOMEM ? kent_error_nomem(err) : KENT_OK;
}
