#include "kent_arith.h"

#include <ctype.h>
#include <float.h>
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { DEPTH = 128, ROUNDED_DIGITS = 6 };

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

/* One open operator; a '(' may belong to a function and then counts its arguments. */
typedef struct pending {
    char op; /* + - * / ^ ( and ~ for a minus in front */
    int function;
    int arguments;
} pending;

typedef struct evaluator {
    kent_interval values[DEPTH];
    size_t value_count;
    pending ops[DEPTH];
    size_t op_count;
    char *error;
    size_t error_size;
    bool failed;
} evaluator;

__attribute__((format(printf, 2, 3))) static void evaluator_fail(evaluator *e,
                                                                 const char *fmt, ...)
{
    va_list args;

    if (e->failed) return;
    e->failed = true;
    va_start(args, fmt);
    (void)vsnprintf(e->error, e->error_size, fmt, args);
    va_end(args);
}

/* ---- intervals ------------------------------------------------------------------- */

/* Outwards by a few roundings of double arithmetic. */
static kent_interval interval(double lo, double hi)
{
    return (kent_interval){lo - 8.0 * DBL_EPSILON * fabs(lo),
                           hi + 8.0 * DBL_EPSILON * fabs(hi)};
}

static kent_interval interval_of(const double *corners, size_t count)
{
    double lo = corners[0], hi = corners[0];

    for (size_t i = 1; i < count; i++) {
        lo = fmin(lo, corners[i]);
        hi = fmax(hi, corners[i]);
    }
    return interval(lo, hi);
}

static kent_interval interval_times(kent_interval a, kent_interval b)
{
    const double corners[] = {a.lo * b.lo, a.lo * b.hi, a.hi * b.lo, a.hi * b.hi};
    return interval_of(corners, 4);
}

static kent_interval interval_over(evaluator *e, kent_interval a, kent_interval b)
{
    if (b.lo <= 0.0 && b.hi >= 0.0) {
        evaluator_fail(e, "division by %g .. %g", b.lo, b.hi);
        return a;
    }
    const double corners[] = {a.lo / b.lo, a.lo / b.hi, a.hi / b.lo, a.hi / b.hi};
    return interval_of(corners, 4);
}

static kent_interval interval_power(evaluator *e, kent_interval a, kent_interval b)
{
    const bool whole = b.lo == b.hi && b.lo == floor(b.lo);
    const double corners[] = {pow(a.lo, b.lo), pow(a.lo, b.hi), pow(a.hi, b.lo),
                              pow(a.hi, b.hi)};

    if (a.lo <= 0.0 && !(whole && b.lo > 0.0)) {
        evaluator_fail(e, "%g .. %g to a power that is not whole", a.lo, a.hi);
        return a;
    }
    kent_interval out = interval_of(corners, 4);
    if (a.lo < 0.0 && a.hi > 0.0 && fmod(b.lo, 2.0) == 0.0) out.lo = 0.0;
    return out;
}

/* sin over degrees: its ends, and the crests and troughs between them. */
static kent_interval interval_sine(evaluator *e, kent_interval a)
{
    const double corners[] = {sin(a.lo * DEGREE), sin(a.hi * DEGREE)};
    kent_interval out = interval_of(corners, 2);

    (void)e;
    out.lo -= DBL_EPSILON; /* next to a zero a relative margin is none */
    out.hi += DBL_EPSILON;
    if (floor((a.hi - 90.0) / 360.0) != floor((a.lo - 90.0) / 360.0)) out.hi = 1.0;
    if (floor((a.hi + 90.0) / 360.0) != floor((a.lo + 90.0) / 360.0)) out.lo = -1.0;
    return out;
}

static kent_interval interval_cosine(evaluator *e, kent_interval a)
{
    return interval_sine(e, (kent_interval){a.lo + 90.0, a.hi + 90.0});
}

static kent_interval interval_tangent(evaluator *e, kent_interval a)
{
    if (ceil((a.lo - 90.0) / 180.0) <= floor((a.hi - 90.0) / 180.0)) {
        evaluator_fail(e, "tan of %g .. %g degrees", a.lo, a.hi);
        return a;
    }
    kent_interval out = interval(tan(a.lo * DEGREE), tan(a.hi * DEGREE));
    out.lo -= DBL_EPSILON;
    out.hi += DBL_EPSILON;
    return out;
}

static kent_interval interval_root(evaluator *e, kent_interval a)
{
    if (a.hi < 0.0) evaluator_fail(e, "square root of %g .. %g", a.lo, a.hi);
    return interval(sqrt(fmax(a.lo, 0.0)), sqrt(fmax(a.hi, 0.0)));
}

static kent_interval interval_size(evaluator *e, kent_interval a)
{
    const double lo = fabs(a.lo), hi = fabs(a.hi);

    (void)e;
    if (a.lo <= 0.0 && a.hi >= 0.0) return (kent_interval){0.0, fmax(lo, hi)};
    return (kent_interval){fmin(lo, hi), fmax(lo, hi)};
}

static kent_interval interval_ceiling(evaluator *e, kent_interval a)
{
    (void)e;
    return (kent_interval){ceil(a.lo), ceil(a.hi)};
}

static kent_interval interval_least(kent_interval a, kent_interval b)
{
    return (kent_interval){fmin(a.lo, b.lo), fmin(a.hi, b.hi)};
}

static kent_interval interval_most(kent_interval a, kent_interval b)
{
    return (kent_interval){fmax(a.lo, b.lo), fmax(a.hi, b.hi)};
}

/* ---- functions ------------------------------------------------------------------- */

/* Either one argument, or any number taken pairwise. */
static const struct function {
    const char *name;
    kent_interval (*one)(evaluator *e, kent_interval a);
    kent_interval (*pair)(kent_interval a, kent_interval b);
} FUNCTIONS[] = {
    {"sin", interval_sine, NULL},    {"cos", interval_cosine, NULL},
    {"tan", interval_tangent, NULL}, {"sqrt", interval_root, NULL},
    {"abs", interval_size, NULL},    {"ceil", interval_ceiling, NULL},
    {"min", NULL, interval_least},   {"max", NULL, interval_most},
};

static int function_find(const char *name, size_t length)
{
    for (size_t i = 0; i < sizeof FUNCTIONS / sizeof FUNCTIONS[0]; i++) {
        if (strlen(FUNCTIONS[i].name) != length) continue;
        if (memcmp(FUNCTIONS[i].name, name, length) == 0) return (int)i;
    }
    return -1;
}

/* ---- stacks ---------------------------------------------------------------------- */

static void evaluator_push(evaluator *e, kent_interval value)
{
    if (e->value_count == DEPTH) {
        evaluator_fail(e, "too deep");
    } else {
        e->values[e->value_count++] = value;
    }
}

static kent_interval evaluator_pop(evaluator *e)
{
    if (e->value_count > 0) return e->values[--e->value_count];
    evaluator_fail(e, "an operand is missing");
    return (kent_interval){0.0, 0.0};
}

static void evaluator_open(evaluator *e, char op, int function)
{
    if (e->op_count == DEPTH) {
        evaluator_fail(e, "too deep");
    } else {
        e->ops[e->op_count++] = (pending){op, function, 1};
    }
}

static int rank(char op)
{
    switch (op) {
    case '+':
    case '-':
        return 1;
    case '*':
    case '/':
        return 2;
    case '~':
        return 3;
    case '^':
        return 4;
    default: /* a parenthesis stops everything */
        return 0;
    }
}

static void evaluator_apply(evaluator *e)
{
    const char op = e->ops[--e->op_count].op;
    const kent_interval b = evaluator_pop(e);

    if (op == '~') {
        evaluator_push(e, (kent_interval){-b.hi, -b.lo});
        return;
    }
    const kent_interval a = evaluator_pop(e);
    switch (op) {
    case '+':
        evaluator_push(e, interval(a.lo + b.lo, a.hi + b.hi));
        break;
    case '-':
        evaluator_push(e, interval(a.lo - b.hi, a.hi - b.lo));
        break;
    case '*':
        evaluator_push(e, interval_times(a, b));
        break;
    case '/':
        evaluator_push(e, interval_over(e, a, b));
        break;
    default:
        evaluator_push(e, interval_power(e, a, b));
        break;
    }
}

/* Applies what stands open with at least this rank. */
static void evaluator_settle(evaluator *e, int least)
{
    while (!e->failed && e->op_count > 0 && rank(e->ops[e->op_count - 1].op) >= least) {
        evaluator_apply(e);
    }
}

static void evaluator_close(evaluator *e)
{
    evaluator_settle(e, 1);
    if (e->op_count == 0) {
        evaluator_fail(e, "a ')' too many");
        return;
    }
    const pending open = e->ops[--e->op_count];
    if (open.function < 0) {
        if (open.arguments != 1) evaluator_fail(e, "a ',' outside a function");
        return;
    }
    const struct function *f = &FUNCTIONS[open.function];
    if (f->one) {
        if (open.arguments != 1) evaluator_fail(e, "%s takes one number", f->name);
        evaluator_push(e, f->one(e, evaluator_pop(e)));
        return;
    }
    kent_interval result = evaluator_pop(e);
    for (int i = 1; i < open.arguments; i++) {
        result = f->pair(result, evaluator_pop(e));
    }
    evaluator_push(e, result);
}

/* ---- reading --------------------------------------------------------------------- */

/* A number with what its last digit leaves open; returns its end. */
static const char *number_read(const char *s, kent_interval *out)
{
    int significant = 0, decimals = 0;
    bool point = false;
    const char *p = s;

    for (; isdigit((unsigned char)*p) || (*p == '.' && !point); p++) {
        if (*p == '.') {
            point = true;
            continue;
        }
        if (*p != '0' || significant > 0) significant++;
        if (point) decimals++;
    }
    char *end = NULL;
    const double value = strtod(s, &end);
    double half = 0.0;
    if (significant >= ROUNDED_DIGITS) {
        const long power = end > p ? strtol(p + 1, NULL, 10) : 0;
        half = 0.5 * pow(10.0, (double)(power - decimals));
    }
    *out = half > 0.0 ? interval(value - half, value + half)
                      : (kent_interval){value, value};
    p = end;
    return strncmp(p, "deg", 3) == 0 ? p + 3 : p;
}

static const char *word_read(evaluator *e, const char *s, bool *operand)
{
    size_t n = 0;

    while (isalnum((unsigned char)s[n]) || s[n] == '_' || s[n] == '\'') {
        n++;
    }
    if (n == 2 && memcmp(s, "pi", 2) == 0) {
        evaluator_push(e, (kent_interval){PI, PI});
        *operand = false;
        return s + n;
    }
    const int function = function_find(s, n);
    if (function < 0 || s[n] != '(') {
        evaluator_fail(e, "'%.*s' is neither a number nor a function", (int)n, s);
        return s + n;
    }
    evaluator_open(e, '(', function);
    return s + n + 1;
}

/* Where an operand must come: a number, a name, a sign or a parenthesis. */
static const char *operand_read(evaluator *e, const char *s, bool *operand)
{
    if (isdigit((unsigned char)*s) || *s == '.') {
        kent_interval value = {0.0, 0.0};
        s = number_read(s, &value);
        evaluator_push(e, value);
        *operand = false;
        return s;
    }
    if (isalpha((unsigned char)*s)) return word_read(e, s, operand);
    if (*s == '-') {
        evaluator_open(e, '~', -1);
    } else if (*s == '(') {
        evaluator_open(e, '(', -1);
    } else {
        evaluator_fail(e, "a number is missing before '%s'", s);
    }
    return s + 1;
}

/* Where an operator must come. */
static const char *operator_read(evaluator *e, const char *s, bool *operand)
{
    switch (*s) {
    case ')':
        evaluator_close(e);
        break;
    case ',':
        evaluator_settle(e, 1);
        if (e->op_count == 0) {
            evaluator_fail(e, "a ',' outside a function");
        } else {
            e->ops[e->op_count - 1].arguments++;
        }
        *operand = true;
        break;
    case '+':
    case '-':
    case '*':
    case '/':
        evaluator_settle(e, rank(*s));
        evaluator_open(e, *s, -1);
        *operand = true;
        break;
    case '^': /* from the right: an open '^' waits */
        evaluator_settle(e, rank(*s) + 1);
        evaluator_open(e, *s, -1);
        *operand = true;
        break;
    default:
        evaluator_fail(e, "'%s' is no operator", s);
        break;
    }
    return s + 1;
}

bool kent_arith_evaluate(const char *text, kent_interval *out, char *error, size_t size)
{
    evaluator e = {.error = error, .error_size = size};
    bool operand = true;

    for (const char *s = text; *s != '\0' && !e.failed;) {
        if (isspace((unsigned char)*s)) {
            s++;
        } else if (operand) {
            s = operand_read(&e, s, &operand);
        } else {
            s = operator_read(&e, s, &operand);
        }
    }
    evaluator_settle(&e, 1);
    if (!e.failed && operand) evaluator_fail(&e, "'%s' ends early", text);
    if (!e.failed && e.op_count > 0) evaluator_fail(&e, "a ')' is missing");
    if (e.failed) return false;
    *out = e.values[0];
    if (isfinite(out->lo) && isfinite(out->hi)) return true;
    evaluator_fail(&e, "'%s' is not bounded", text);
    return false;
}

bool kent_arith_agrees(const char *arithmetic, const char *printed, char *error,
                       size_t size)
{
    kent_interval want = {0.0, 0.0}, got = {0.0, 0.0};
    const char *s = printed;

    while (*s == '(' || isspace((unsigned char)*s)) {
        s++;
    }
    const bool negative = *s == '-';
    if (negative) s++;
    if (!isdigit((unsigned char)*s)) {
        (void)snprintf(error, size, "'%s' holds no number", printed);
        return false;
    }
    (void)number_read(s, &got);
    if (negative) got = (kent_interval){-got.hi, -got.lo};
    if (!kent_arith_evaluate(arithmetic, &want, error, size)) return false;
    if (got.lo <= want.hi && want.lo <= got.hi) return true;
    (void)snprintf(error, size, "%s = %s, but the digits give %.9g .. %.9g", arithmetic,
                   printed, want.lo, want.hi);
    return false;
}
